//! What carries a load: the incidence or the flap angle, the most there is, the speed it takes, the drag
//! it costs.

use super::error::checked;
use super::{LiftingLine, Loading, LoadingError, SectionLift, State};

/// Steps over the range in which a load is looked for. Lift that crosses the load twice within one is not
/// seen, which at a degree or two apart no lift curve does.
const STEPS: usize = 24;
/// Nearness to the load at which the search ends, as a share of it, and steps before it gives up.
const NEAR: f64 = 1e-9;
const HALVINGS: usize = 60;
/// Steps of the golden section about the greatest lift: within 1e-5 of the bracket.
const SECTIONS: usize = 24;
/// 1 / golden ratio.
const GOLDEN: f64 = 0.618_033_988_749_895;

/// What is turned until the foil carries its load.
#[derive(Clone, Copy)]
enum Control {
    Incidence,
    Flap,
}

impl Control {
    fn word(self) -> &'static str {
        match self {
            Self::Incidence => "incidence",
            Self::Flap => "flap",
        }
    }

    fn set(self, state: &State, angle: f64) -> State {
        match self {
            Self::Incidence => State { incidence: angle, ..*state },
            Self::Flap => State { flap: angle, ..*state },
        }
    }

    fn of(self, state: &State) -> f64 {
        match self {
            Self::Incidence => state.incidence,
            Self::Flap => state.flap,
        }
    }
}

/// When a boat comes out of the water.
#[derive(Debug, Clone, PartialEq)]
pub struct TakeOff {
    /// Least speed that carries the load, m/s.
    pub speed: f64,
    /// The foil at that speed.
    pub loading: Loading,
}

/// A load carried at one speed, or why it is not.
#[derive(Debug, Clone, PartialEq)]
pub struct SpeedPoint {
    /// m/s.
    pub speed: f64,
    /// The foil as it carries the load: its drag and power are [`Loading::drag`] and [`Loading::power`].
    pub carried: Result<Loading, LoadingError>,
}

impl LiftingLine {
    /// The incidence within `range` (radians) that carries `load` N, at the speed and flap angle of `state`.
    /// Of several the least, which is the one before the stall.
    ///
    /// # Errors
    /// When the foil cannot carry it (with the most it could) or lifts more throughout, when the range or
    /// the state makes no sense, or no load settles.
    pub fn incidence_for(
        &self,
        sections: &dyn SectionLift,
        state: &State,
        load: f64,
        range: (f64, f64),
    ) -> Result<Loading, LoadingError> {
        self.seek(sections, state, load, range, Control::Incidence)
    }

    /// The flap angle within `range` (radians) that carries `load` N, at the speed and incidence of `state`.
    ///
    /// # Errors
    /// As [`LiftingLine::incidence_for`].
    pub fn flap_for(
        &self,
        sections: &dyn SectionLift,
        state: &State,
        load: f64,
        range: (f64, f64),
    ) -> Result<Loading, LoadingError> {
        self.seek(sections, state, load, range, Control::Flap)
    }

    /// The most the foil lifts at an incidence within `range` (radians), as far as its lift curves are known.
    ///
    /// # Errors
    /// As [`LiftingLine::incidence_for`].
    pub fn greatest_lift(
        &self,
        sections: &dyn SectionLift,
        state: &State,
        range: (f64, f64),
    ) -> Result<Loading, LoadingError> {
        let seen = self.scan(sections, state, range, Control::Incidence, f64::INFINITY)?;
        self.highest(sections, state, &seen, Control::Incidence)
    }

    /// The least incidence within `range` at which a section reaches its greatest lift; the strip is
    /// [`Loading::nearest_to_stall`]. `None` when none does.
    ///
    /// # Errors
    /// When the state makes no sense, or the load does not settle.
    pub fn stall_onset(
        &self,
        sections: &dyn SectionLift,
        state: &State,
        range: (f64, f64),
    ) -> Result<Option<Loading>, LoadingError> {
        let stalled = |loading: &Loading| {
            loading
                .nearest_to_stall()
                .and_then(|strip| strip.stall_margin)
                .is_some_and(|margin| margin <= 0.0)
        };
        let (low, high) = ordered(range)?;
        let mut before: Option<Loading> = None;
        for step in 0..=STEPS {
            let incidence = low + (high - low) * step as f64 / STEPS as f64;
            let at = |incidence| State { incidence, ..*state };
            let here = self.load_from(sections, &at(incidence), before.as_ref())?;
            if !stalled(&here) {
                before = Some(here);
                continue;
            }
            let Some(mut sound) = before else { return Ok(Some(here)) };
            let mut past = here;
            for _ in 0..SECTIONS {
                let middle = f64::midpoint(sound.state.incidence, past.state.incidence);
                let tried = self.load_from(sections, &at(middle), Some(&sound))?;
                if stalled(&tried) { past = tried } else { sound = tried }
            }
            return Ok(Some(past));
        }
        Ok(None)
    }

    /// The least speed that carries `load` N when no more than `share` (above 0, at most 1) of the greatest
    /// lift is used, at the flap angle of `state`. Its speed is that at which the sections are read; where
    /// they change with speed, ask again with the answer's.
    ///
    /// # Errors
    /// When the share or the load makes no sense, or as [`LiftingLine::greatest_lift`].
    pub fn take_off(
        &self,
        sections: &dyn SectionLift,
        state: &State,
        load: f64,
        share: f64,
        range: (f64, f64),
    ) -> Result<TakeOff, LoadingError> {
        checked("the share of the greatest lift", share, "above 0 and at most 1", |s| s > 0.0 && s <= 1.0)?;
        checked("the load", load, "a positive number of N", |load| load > 0.0)?;
        let most = self.greatest_lift(sections, state, range)?;
        if most.lift <= 0.0 {
            return Err(too_much(&most, load, Control::Incidence));
        }
        // Coefficients stay as they are, so lift goes with the square of the speed.
        let speed = state.speed * (load / (share * most.lift)).sqrt();
        // With the whole of the greatest lift there is nothing left to look for.
        let loading = if share == 1.0 {
            most.at_speed(speed)
        } else {
            let at_speed = State { speed, ..*state };
            self.incidence_for(sections, &at_speed, load, (range.0, most.state.incidence))?
        };
        Ok(TakeOff { speed, loading })
    }

    /// The load carried at each of the speeds (m/s) by incidence, or why it is not: drag and power over speed.
    pub fn over_speeds(
        &self,
        sections: &dyn SectionLift,
        state: &State,
        load: f64,
        range: (f64, f64),
        speeds: &[f64],
    ) -> Vec<SpeedPoint> {
        let carry = |&speed: &f64| {
            let carried = self.incidence_for(sections, &State { speed, ..*state }, load, range);
            SpeedPoint { speed, carried }
        };
        speeds.iter().map(carry).collect()
    }

    fn seek(
        &self,
        sections: &dyn SectionLift,
        state: &State,
        load: f64,
        range: (f64, f64),
        control: Control,
    ) -> Result<Loading, LoadingError> {
        checked("the load", load, "a finite number of N", |_| true)?;
        let seen = self.scan(sections, state, range, control, load)?;
        let [.., last] = seen.as_slice() else { return Err(unknown(range, control)) };
        if last.lift >= load {
            return match seen.len().checked_sub(2) {
                Some(before) => self.between(sections, state, load, &seen[before], last, control),
                None if last.lift <= load * (1.0 + NEAR) => Ok(last.clone()),
                None => Err(LoadingError::TooLittle {
                    load,
                    speed: state.speed,
                    least: last.lift,
                    degrees: control.of(&last.state).to_degrees(),
                    control: control.word(),
                }),
            };
        }
        // The top may lie between two steps and just reach the load.
        let most = self.highest(sections, state, &seen, control)?;
        let below = seen.iter().rfind(|one| control.of(&one.state) < control.of(&most.state));
        match below {
            Some(below) if most.lift >= load => self.between(sections, state, load, below, &most, control),
            _ => Err(too_much(&most, load, control)),
        }
    }

    /// Loads over the range in ascending steps, as far as the sections are known, until one lifts `enough`.
    fn scan(
        &self,
        sections: &dyn SectionLift,
        state: &State,
        range: (f64, f64),
        control: Control,
        enough: f64,
    ) -> Result<Vec<Loading>, LoadingError> {
        let (low, high) = ordered(range)?;
        let mut seen: Vec<Loading> = Vec::with_capacity(STEPS + 1);
        let mut failure = None;
        for step in 0..=STEPS {
            let angle = low + (high - low) * step as f64 / STEPS as f64;
            match self.load_from(sections, &control.set(state, angle), seen.last()) {
                Ok(loading) if !loading.is_beyond() => seen.push(loading),
                Err(error @ LoadingError::Quantity { .. }) => return Err(error),
                Err(error) if seen.is_empty() => failure = Some(error),
                // Below what is known: go on. Past it, or past what settles: the range ends here.
                Ok(_) if seen.is_empty() => {}
                _ => break,
            }
            if seen.last().is_some_and(|loading| loading.lift >= enough) {
                break;
            }
        }
        if seen.is_empty() {
            return Err(failure.unwrap_or_else(|| unknown(range, control)));
        }
        Ok(seen)
    }

    /// Closes in on the load between a lower and a higher lift, by the secant held within the bracket
    /// (Illinois rule: Dowell and Jarratt 1971).
    fn between(
        &self,
        sections: &dyn SectionLift,
        state: &State,
        load: f64,
        below: &Loading,
        above: &Loading,
        control: Control,
    ) -> Result<Loading, LoadingError> {
        let (mut low, mut high) = (control.of(&below.state), control.of(&above.state));
        let (mut short, mut over) = (below.lift - load, above.lift - load);
        let mut nearest = if short.abs() < over.abs() { below.clone() } else { above.clone() };
        let mut last_side = 0;
        for _ in 0..HALVINGS {
            if (nearest.lift - load).abs() <= NEAR * load.abs().max(1e-3) || high - low < 1e-14 {
                break;
            }
            let angle = (low * over - high * short) / (over - short);
            let angle = if angle > low && angle < high { angle } else { f64::midpoint(low, high) };
            let tried = self.load_from(sections, &control.set(state, angle), Some(&nearest))?;
            let miss = tried.lift - load;
            let side = if miss < 0.0 { -1 } else { 1 };
            if side < 0 {
                (low, short) = (angle, miss);
                over *= if last_side == side { 0.5 } else { 1.0 };
            } else {
                (high, over) = (angle, miss);
                short *= if last_side == side { 0.5 } else { 1.0 };
            }
            last_side = side;
            if miss.abs() < (nearest.lift - load).abs() {
                nearest = tried;
            }
        }
        Ok(nearest)
    }

    /// The highest lift about the highest of those seen, by the golden section.
    fn highest(
        &self,
        sections: &dyn SectionLift,
        state: &State,
        seen: &[Loading],
        control: Control,
    ) -> Result<Loading, LoadingError> {
        let top = (0..seen.len()).max_by(|&a, &b| seen[a].lift.total_cmp(&seen[b].lift)).unwrap_or(0);
        let Some(mut best) = seen.get(top).cloned() else { return Err(unknown((0.0, 0.0), control)) };
        let angle = |i: usize| control.of(&seen[i.min(seen.len() - 1)].state);
        let (mut low, mut high) = (angle(top.saturating_sub(1)), angle(top + 1));
        for _ in 0..SECTIONS {
            let width = GOLDEN * (high - low);
            let lift = |angle: f64| {
                let loading = self.load_from(sections, &control.set(state, angle), Some(&best));
                loading.ok().filter(|loading| !loading.is_beyond())
            };
            let (a, b) = (lift(high - width), lift(low + width));
            let value = |loading: &Option<Loading>| loading.as_ref().map_or(f64::NEG_INFINITY, |l| l.lift);
            if value(&a) >= value(&b) {
                high = low + width
            } else {
                low = high - width
            }
            for tried in [a, b].into_iter().flatten() {
                if tried.lift > best.lift {
                    best = tried;
                }
            }
        }
        Ok(best)
    }
}

fn ordered((low, high): (f64, f64)) -> Result<(f64, f64), LoadingError> {
    checked("the low end of the range", low, "a finite angle", |_| true)?;
    checked("the high end of the range", high, "an angle above the low end", |high| high > low)?;
    Ok((low, high))
}

fn too_much(most: &Loading, load: f64, control: Control) -> LoadingError {
    LoadingError::TooMuch {
        load,
        speed: most.state.speed,
        most: most.lift,
        degrees: control.of(&most.state).to_degrees(),
        control: control.word(),
    }
}

fn unknown((low, high): (f64, f64), control: Control) -> LoadingError {
    let [low, high] = [low, high].map(f64::to_degrees);
    let why = format!("nothing is known of it between {low:.1}° and {high:.1}° of {}", control.word());
    LoadingError::Table { why }
}
