//! What a strip of the foil knows of its section: lift, drag and moment over incidence and flap angle.

use super::LoadingError;
use super::error::checked;
use std::f64::consts::TAU;

/// A section at one incidence, as coefficients for its own chord.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct SectionPoint {
    /// Lift.
    pub cl: f64,
    /// Profile drag.
    pub cd: f64,
    /// Moment about the quarter chord, nose up.
    pub cm: f64,
    /// Whether the incidence or the flap angle lies outside of what is known: the values are then those
    /// of the nearest end.
    pub beyond: bool,
}

/// The greatest lift of a section.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct GreatestLift {
    /// Incidence at which it is reached, radians.
    pub incidence: f64,
    /// Lift coefficient there.
    pub cl: f64,
}

/// Lift curves along a foil. Values must be finite for every finite question.
pub trait SectionLift {
    /// The section `along_span_mm` from the root at an effective incidence and a flap angle (trailing edge
    /// down), both in radians.
    fn at(&self, along_span_mm: f64, incidence: f64, flap: f64) -> SectionPoint;

    /// Its greatest lift; `None` when the curve does not show one.
    fn greatest(&self, _along_span_mm: f64, _flap: f64) -> Option<GreatestLift> {
        None
    }
}

/// The straight lift curve of thin-section theory, without stall.
///
/// Source: Glauert, "The Elements of Aerofoil and Airscrew Theory" (1926), chapter VII; the flap's
/// effectiveness is that of a hinge, 1 - (θ - sin θ)/π with cos θ = 1 - 2 x/c (Glauert, R&M 1095, 1927).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ThinSection {
    /// Lift slope per radian; 2π in theory.
    pub slope: f64,
    /// Incidence of no lift, radians.
    pub zero_lift: f64,
    /// How much of a flap angle acts as incidence, from 0 to 1.
    pub flap_effectiveness: f64,
    /// Profile drag, the same at every incidence.
    pub cd: f64,
    /// Moment about the quarter chord, nose up.
    pub cm: f64,
}

impl Default for ThinSection {
    fn default() -> Self {
        Self { slope: TAU, zero_lift: 0.0, flap_effectiveness: 0.0, cd: 0.0, cm: 0.0 }
    }
}

impl SectionLift for ThinSection {
    fn at(&self, _along_span_mm: f64, incidence: f64, flap: f64) -> SectionPoint {
        let cl = self.slope * (incidence - self.zero_lift + self.flap_effectiveness * flap);
        SectionPoint { cl, cd: self.cd, cm: self.cm, beyond: false }
    }
}

/// A known point of a lift curve.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CurvePoint {
    /// Incidence, radians.
    pub incidence: f64,
    /// Lift coefficient.
    pub cl: f64,
    /// Profile drag coefficient.
    pub cd: f64,
    /// Moment coefficient about the quarter chord, nose up.
    pub cm: f64,
}

/// A lift curve at one flap angle.
#[derive(Debug, Clone, PartialEq)]
pub struct FlapCurve {
    /// Flap angle, trailing edge down, radians.
    pub flap: f64,
    /// Points at ascending incidence, two or more.
    pub points: Vec<CurvePoint>,
}

/// Lift curves of one section from points, in straight lines between points and between flap angles.
#[derive(Debug, Clone, PartialEq)]
pub struct SectionTable {
    curves: Vec<FlapCurve>,
}

impl SectionTable {
    /// A section without a flap. A flap angle asked of it is `beyond`.
    ///
    /// # Errors
    /// As [`SectionTable::with_flap`].
    pub fn new(points: Vec<CurvePoint>) -> Result<Self, LoadingError> {
        Self::with_flap(vec![FlapCurve { flap: 0.0, points }])
    }

    /// A section with curves at ascending flap angles.
    ///
    /// # Errors
    /// When there is no curve, a curve has fewer than two points, angles do not ascend, a value is not
    /// finite or a drag is negative.
    pub fn with_flap(curves: Vec<FlapCurve>) -> Result<Self, LoadingError> {
        let wrong = |why: String| Err(LoadingError::Table { why });
        if curves.is_empty() {
            return wrong("there is no curve".into());
        }
        if curves.iter().any(|curve| !curve.flap.is_finite())
            || curves.windows(2).any(|pair| pair[1].flap <= pair[0].flap)
        {
            return wrong("flap angles must be numbers and ascend from curve to curve".into());
        }
        for curve in &curves {
            let degrees = curve.flap.to_degrees();
            if curve.points.len() < 2 {
                return wrong(format!("at a flap angle of {degrees:.1}° it has fewer than two points"));
            }
            if let Some(bad) = curve.points.iter().find(|p| {
                ![p.incidence, p.cl, p.cd, p.cm].iter().all(|value| value.is_finite()) || p.cd < 0.0
            }) {
                let at = bad.incidence.to_degrees();
                return wrong(format!(
                    "the point at {at:.2}° needs finite values and a drag that is not negative"
                ));
            }
            if let Some(pair) = curve.points.windows(2).find(|pair| pair[1].incidence <= pair[0].incidence) {
                let (before, after) = (pair[0].incidence.to_degrees(), pair[1].incidence.to_degrees());
                return wrong(format!("{after:.2}° follows {before:.2}°: incidences must ascend"));
            }
        }
        Ok(Self { curves })
    }

    fn point(&self, incidence: f64, flap: f64) -> SectionPoint {
        let (inner, outer, share, beyond) = place(&self.curves, flap, |curve| curve.flap);
        let a = on_curve(&self.curves[inner].points, incidence);
        let mut mixed = mix(a, on_curve(&self.curves[outer].points, incidence), share);
        mixed.beyond |= beyond;
        mixed
    }

    fn top(&self, flap: f64) -> Option<GreatestLift> {
        let (inner, outer, share, _) = place(&self.curves, flap, |curve| curve.flap);
        let (a, b) = (peak(&self.curves[inner].points)?, peak(&self.curves[outer].points)?);
        // The greatest of the mixed curve lies at a corner of either; the mixed corners are near enough
        // to state where, and the value is read off the mixed curve itself.
        let incidence = a.incidence + share * (b.incidence - a.incidence);
        Some(GreatestLift { incidence, cl: self.point(incidence, flap).cl })
    }
}

/// The highest point, when the curve falls after it.
fn peak(points: &[CurvePoint]) -> Option<GreatestLift> {
    let highest = points.iter().max_by(|a, b| a.cl.total_cmp(&b.cl))?;
    let falls = points.last().is_some_and(|last| last.incidence > highest.incidence);
    falls.then_some(GreatestLift { incidence: highest.incidence, cl: highest.cl })
}

/// Neighbours of `value` among ascending keys, the share of the second, and whether it lies outside.
fn place<T>(items: &[T], value: f64, key: impl Fn(&T) -> f64) -> (usize, usize, f64, bool) {
    let after = items.partition_point(|item| key(item) <= value);
    let last = items.len() - 1;
    if after == 0 {
        return (0, 0, 0.0, value < key(&items[0]));
    }
    if after > last {
        return (last, last, 0.0, value > key(&items[last]));
    }
    let (low, high) = (key(&items[after - 1]), key(&items[after]));
    (after - 1, after, (value - low) / (high - low), false)
}

fn on_curve(points: &[CurvePoint], incidence: f64) -> SectionPoint {
    let (inner, outer, share, beyond) = place(points, incidence, |point| point.incidence);
    let known = |i: usize| {
        let p = &points[i];
        SectionPoint { cl: p.cl, cd: p.cd, cm: p.cm, beyond }
    };
    mix(known(inner), known(outer), share)
}

/// `share` of `b`, the rest of `a`.
pub(super) fn mix(a: SectionPoint, b: SectionPoint, share: f64) -> SectionPoint {
    let between = |from: f64, to: f64| from + share * (to - from);
    SectionPoint {
        cl: between(a.cl, b.cl),
        cd: between(a.cd, b.cd),
        cm: between(a.cm, b.cm),
        // What has no share in it cannot be asked too much.
        beyond: (a.beyond && share < 1.0) || (b.beyond && share > 0.0),
    }
}

impl SectionLift for SectionTable {
    fn at(&self, _along_span_mm: f64, incidence: f64, flap: f64) -> SectionPoint {
        self.point(incidence, flap)
    }

    fn greatest(&self, _along_span_mm: f64, flap: f64) -> Option<GreatestLift> {
        self.top(flap)
    }
}

/// Tables at several places, in straight lines between them; past the ends the nearest holds.
#[derive(Debug, Clone, PartialEq)]
pub struct SpanTables {
    places: Vec<(f64, SectionTable)>,
}

impl SpanTables {
    /// Tables at ascending distances from the root, mm.
    ///
    /// # Errors
    /// When there is none, or places are not finite or do not ascend.
    pub fn new(places: Vec<(f64, SectionTable)>) -> Result<Self, LoadingError> {
        if places.is_empty() {
            return Err(LoadingError::Table { why: "there is no table along the span".into() });
        }
        for (at, _) in &places {
            checked("the place of a table", *at, "a finite number of mm", |_| true)?;
        }
        if let Some(pair) = places.windows(2).find(|pair| pair[1].0 <= pair[0].0) {
            let why = format!("a table at {} mm follows one at {} mm", pair[1].0, pair[0].0);
            return Err(LoadingError::Table { why });
        }
        Ok(Self { places })
    }
}

impl SectionLift for SpanTables {
    fn at(&self, along_span_mm: f64, incidence: f64, flap: f64) -> SectionPoint {
        let (inner, outer, share, _) = place(&self.places, along_span_mm, |place| place.0);
        let [a, b] = [inner, outer].map(|i| self.places[i].1.point(incidence, flap));
        mix(a, b, share)
    }

    fn greatest(&self, along_span_mm: f64, flap: f64) -> Option<GreatestLift> {
        let (inner, outer, share, _) = place(&self.places, along_span_mm, |place| place.0);
        let (a, b) = (self.places[inner].1.top(flap)?, self.places[outer].1.top(flap)?);
        let incidence = a.incidence + share * (b.incidence - a.incidence);
        Some(GreatestLift { incidence, cl: self.at(along_span_mm, incidence, flap).cl })
    }
}
