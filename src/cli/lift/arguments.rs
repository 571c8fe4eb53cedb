//! What is typed after `plankform lift`.

use std::path::PathBuf;

use plankform::flow::{Conditions, NoseFinish, Salinity};
use plankform::units::{LENGTH, Length, Quantity, SPEED, TEMPERATURE};

use super::super::number_list;
use super::super::section::chord;
use super::super::section_source::SectionSource;
use super::super::{Failure, Format};
use super::running::{Running, Surroundings};

/// Lift curve of a section, with drag, moment, transition, cavitation and pressure
#[derive(Debug, clap::Args)]
#[command(
    after_help = "Examples:\n  plankform lift \"NACA 4412\" --re 5e5,1e6 --angles -4:14:1\n  plankform lift \"NACA 2412\" --chord \"120 mm\" --speed \"8 kn,12 kn\" --depth \"450 mm\" --angles -4:14:2 --finish both --svg lift.svg\n  plankform lift \"NACA 4412\" --re 5e5 --angles -2:10:2 --amplification 9,4\n  plankform lift \"NACA 4412\" --angles -4:10:1 --inviscid --pressure --format json"
)]
pub(in crate::cli) struct Arguments {
    #[command(flatten)]
    pub(super) source: SectionSource,
    /// Reynolds numbers by the chord, with commas between them; or give --chord and --speed
    #[arg(long, value_name = "RE[,RE]", allow_hyphen_values = true, value_parser = number_list::positive_list)]
    pub(super) re: Option<std::vec::Vec<f64>>,
    /// Incidence in degrees, nose up positive: from FROM in whole steps up to TO, or one value
    #[arg(long, value_name = "FROM:TO:STEP", allow_hyphen_values = true, value_parser = angles)]
    pub(super) angles: std::vec::Vec<f64>,
    /// Chord of the section, such as "120 mm": forces are given for each metre of span
    #[arg(long, value_name = "LEN", allow_hyphen_values = true, value_parser = chord)]
    pub(super) chord: Option<Length>,
    /// Speeds through the water, such as "8 kn,12 kn"; with the chord they make the Reynolds number
    #[arg(long, value_name = "SPEED[,SPEED]", allow_hyphen_values = true, value_parser = speeds, requires = "chord")]
    speed: Option<std::vec::Vec<f64>>,
    /// Sea water, or fresh
    #[arg(long, default_value = "sea")]
    water: WaterKind,
    /// Temperature of the water
    #[arg(long, value_name = "TEMP", default_value = "15 °C", allow_hyphen_values = true, value_parser = temperature)]
    temperature: f64,
    /// Depth of the foil below the surface, such as "450 mm": gives the speeds of cavitation
    #[arg(long, value_name = "LEN", allow_hyphen_values = true, value_parser = depth)]
    depth: Option<f64>,
    /// By what share the cavitation number is to stay above the greatest suction
    #[arg(long, value_name = "SHARE", default_value_t = 0.0, allow_hyphen_values = true, value_parser = margin, requires = "depth")]
    cavitation_margin: f64,
    /// Finish of the nose: smooth, rough (turbulent from 2 % of the chord on) or both
    #[arg(long, default_value = "smooth", conflicts_with = "inviscid")]
    finish: Finish,
    /// Amplification exponent N at which the layers become turbulent: 9 in a clean tank, less in
    /// natural water; two or more, such as 9,4, give the band between still and natural water
    #[arg(long, value_name = "N[,N]", default_value = "9", value_parser = amplifications)]
    amplification: std::vec::Vec<f64>,
    /// Make the layers turbulent at this part of the chord: upper side, lower side, or one for both
    #[arg(long, value_name = "X[,X]", value_parser = trips)]
    trip: Option<[f64; 2]>,
    /// Deflections of a flap in degrees, trailing edge down positive, with commas between them
    #[arg(long, value_name = "ANGLE[,ANGLE]", allow_hyphen_values = true, value_parser = number_list::list, requires = "hinge")]
    pub(super) flap: Option<std::vec::Vec<f64>>,
    /// Where the flap's hinge lies, a fraction of the chord from the nose
    #[arg(long, value_name = "X", requires = "flap", allow_hyphen_values = true)]
    pub(super) hinge: Option<f64>,
    /// Where its axis lies across the chord
    #[arg(long, value_name = "WHERE", requires = "flap", default_value = "middle")]
    pub(super) axis: Axis,
    /// Flow without friction: lift, moment and pressure, but no drag and no stall
    #[arg(long)]
    pub(super) inviscid: bool,
    /// Also give the pressure along the outline
    #[arg(long)]
    pub(super) pressure: bool,
    /// Also give the boundary layers along both sides and the wake: θ, δ*, H and the friction
    #[arg(long, conflicts_with = "inviscid")]
    pub(super) layers: bool,
    /// How to print
    #[arg(long, default_value = "text")]
    pub(super) format: Format,
    /// Also draw lift, drag, moment, transition and the cavitation bucket to this SVG file
    #[arg(long, value_name = "FILE")]
    pub(super) svg: Option<PathBuf>,
}

/// Where a flap's axis lies.
#[derive(Debug, Clone, Copy, PartialEq, Eq, clap::ValueEnum)]
pub(super) enum Axis {
    /// In the upper surface
    Upper,
    /// Midway between the surfaces
    Middle,
    /// In the lower surface
    Lower,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, clap::ValueEnum)]
enum WaterKind {
    Sea,
    Fresh,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, clap::ValueEnum)]
enum Finish {
    Smooth,
    Rough,
    Both,
}

impl Arguments {
    /// What each is right alone and wrong together.
    pub(super) fn refuse_what_conflicts(&self) -> Result<(), Failure> {
        let refuse = |why: &str| Err(Failure::Input(why.to_owned()));
        if self.pressure && self.layers && self.format == Format::Csv {
            return refuse("one table at a time as CSV: give --pressure or --layers, or --format json");
        }
        if self.trip.is_some() && self.finish != Finish::Smooth {
            return refuse("a rough nose is a trip at 2 % of the chord: give --trip or --finish, not both");
        }
        Ok(())
    }

    /// The water and what runs in it.
    pub(super) fn surroundings(&self) -> Result<Surroundings, Failure> {
        let salinity = match self.water {
            WaterKind::Sea => Salinity::Sea,
            WaterKind::Fresh => Salinity::Fresh,
        };
        let chord = self.chord.map(|chord| chord.mm() * 1e-3);
        Surroundings::of(salinity, self.temperature, chord, self.depth, self.cavitation_margin)
    }

    /// The speeds or Reynolds numbers that are asked, one at least.
    pub(super) fn running(&self, surroundings: &Surroundings) -> Result<Vec<Running>, Failure> {
        let chord = surroundings.chord;
        let of_speed = |&speed: &f64| Running {
            reynolds: chord.map(|chord| surroundings.water.reynolds(chord, speed)),
            speed: Some(speed),
        };
        // Known chord and Reynolds number make the speed.
        let of_reynolds = |&reynolds: &f64| Running {
            reynolds: Some(reynolds),
            speed: chord.map(|chord| reynolds * surroundings.water.viscosity / chord),
        };
        match (&self.re, &self.speed) {
            (Some(_), Some(_)) => Err(Failure::Input(
                "--re and --speed say the same in two ways: the Reynolds number follows from chord and speed; give one of them"
                    .to_owned(),
            )),
            (None, Some(speeds)) => Ok(speeds.iter().map(of_speed).collect()),
            (Some(numbers), None) if !self.inviscid => Ok(numbers.iter().map(of_reynolds).collect()),
            (None, None) if !self.inviscid => Err(Failure::Input(
                "a lift curve with friction needs its Reynolds number: give --re, or --chord and --speed; or ask for --inviscid"
                    .to_owned(),
            )),
            _ => Ok(vec![Running { reynolds: None, speed: None }]),
        }
    }

    /// What the flow is solved for: each finish at each amplification exponent. A rough nose leaves
    /// nothing to amplify, so that it comes once.
    pub(super) fn conditions(&self, running: Running) -> Vec<(NoseFinish, Conditions)> {
        let finishes: &[NoseFinish] = match self.finish {
            Finish::Smooth => &[NoseFinish::Smooth],
            Finish::Rough => &[NoseFinish::Rough],
            Finish::Both => &NoseFinish::BOTH,
        };
        let reynolds = running.reynolds.unwrap_or(f64::NAN);
        let mut all = Vec::new();
        for &finish in finishes {
            let count = if finish == NoseFinish::Rough { 1 } else { self.amplification.len() };
            for &amplification in &self.amplification[..count] {
                let free = Conditions {
                    trip_upper: self.trip.map(|[upper, _]| upper),
                    trip_lower: self.trip.map(|[_, lower]| lower),
                    ..Conditions::free(reynolds, amplification)
                };
                all.push((finish, finish.on(free)));
            }
        }
        all
    }
}

/// Beyond this potential flow says nothing about a section.
const GREATEST_ANGLE: f64 = 30.0;

fn angles(text: &str) -> Result<Vec<f64>, String> {
    let values = number_list::range(text)?;
    match values.iter().find(|v| v.abs() > GREATEST_ANGLE) {
        Some(bad) => Err(format!("{bad}° is outside -{GREATEST_ANGLE}° to {GREATEST_ANGLE}°")),
        None => Ok(values),
    }
}

/// A quantity within its bounds, in its base unit.
fn within(quantity: &'static Quantity, from: &str, to: &str, text: &str) -> Result<f64, String> {
    let value = quantity.parse(text).map_err(|e| e.to_string())?;
    let [least, most] = [from, to].map(|bound| quantity.parse(bound).unwrap_or(f64::NAN));
    if (least..=most).contains(&value) {
        Ok(value)
    } else {
        Err(format!("{} is out of bounds: {from} to {to}", text.trim()))
    }
}

fn speeds(text: &str) -> Result<Vec<f64>, String> {
    text.split(',').map(|speed| within(&SPEED, "0.1 m/s", "50 m/s", speed)).collect()
}

fn temperature(text: &str) -> Result<f64, String> {
    within(&TEMPERATURE, "0 °C", "30 °C", text)
}

/// In metres.
fn depth(text: &str) -> Result<f64, String> {
    within(&LENGTH, "0 mm", "5 m", text).map(|mm| mm * 1e-3)
}

fn margin(text: &str) -> Result<f64, String> {
    let value: f64 = text.parse().map_err(|_| format!("'{text}' is not a number"))?;
    if (0.0..=2.0).contains(&value) {
        Ok(value)
    } else {
        Err(format!("{text} is outside 0 to 2: 0.2 keeps the number a fifth above"))
    }
}

fn amplifications(text: &str) -> Result<Vec<f64>, String> {
    let values = number_list::list(text)?;
    match values.iter().find(|value| !(0.1..=20.0).contains(*value)) {
        Some(bad) => Err(format!("{bad} is outside 0.1 to 20")),
        None => Ok(values),
    }
}

fn trips(text: &str) -> Result<[f64; 2], String> {
    let place = |text: &str| -> Result<f64, String> {
        let value: f64 = text.trim().parse().map_err(|_| format!("'{text}' is not a number"))?;
        if (0.0..=1.0).contains(&value) { Ok(value) } else { Err(format!("{text} is off the chord, 0 to 1")) }
    };
    let places: Vec<f64> = text.split(',').map(place).collect::<Result<_, _>>()?;
    match *places.as_slice() {
        [both] => Ok([both, both]),
        [upper, lower] => Ok([upper, lower]),
        _ => Err("write one value, or two with a comma between: upper side, lower side".to_owned()),
    }
}
