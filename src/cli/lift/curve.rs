//! A curve, with friction or without, seen in one way by everything that shows it.

use plankform::flow::{
    Bucket, CurvePoint, LiftCurve, NoseFinish, PotentialFlow, PressurePoint, Solution, ViscousSolution,
    hinge_moment,
};
use plankform::geometry::Point;

use super::running::{Running, Scale};

/// A curve of the section with its flap at one angle.
pub(super) struct Curve {
    /// Degrees.
    pub(super) flap: f64,
    /// The axis of the flap, if there is one.
    pub(super) axis: Option<Point>,
    pub(super) running: Running,
    /// Without friction there is none.
    pub(super) finish: Option<NoseFinish>,
    pub(super) flow: Flow,
}

pub(super) enum Flow {
    Viscous(LiftCurve),
    Frictionless(Frictionless),
}

/// A curve without friction.
pub(super) struct Frictionless {
    /// Per radian.
    slope: f64,
    /// Radians.
    zero_lift: f64,
    bucket: Bucket,
    points: Vec<(f64, Solution)>,
}

/// One incidence of a curve.
pub(super) struct Row<'a> {
    /// Degrees.
    pub(super) angle: f64,
    /// `None` where no flow was found.
    pub(super) at: Option<At<'a>>,
}

/// The flow at one incidence.
#[derive(Clone, Copy)]
pub(super) struct At<'a> {
    pub(super) cl: f64,
    pub(super) cd: Option<f64>,
    pub(super) cm: f64,
    pub(super) cp_min: f64,
    pub(super) hinge_moment: Option<f64>,
    pub(super) pressure: &'a [PressurePoint],
    pub(super) viscous: Option<&'a ViscousSolution>,
}

impl<'a> At<'a> {
    fn viscous(s: &'a ViscousSolution) -> Self {
        let (cd, pressure) = (Some(s.cd), &s.pressure[..]);
        Self { cl: s.cl, cd, cm: s.cm, cp_min: s.cp_min, hinge_moment: None, pressure, viscous: Some(s) }
    }

    fn frictionless(s: &'a Solution) -> Self {
        let pressure = &s.pressure[..];
        Self { cl: s.cl, cd: None, cm: s.cm, cp_min: s.cp_min, hinge_moment: None, pressure, viscous: None }
    }
}

/// What a curve comes to as a whole; angles in degrees.
pub(super) struct Summary {
    pub(super) slope_per_degree: Option<f64>,
    pub(super) zero_lift: Option<f64>,
    /// Lift coefficient and angle.
    pub(super) greatest_lift: Option<[f64; 2]>,
    /// Drag coefficient, lift coefficient and angle.
    pub(super) least_drag: Option<[f64; 3]>,
    /// Lift over drag, lift coefficient and angle.
    pub(super) best_ratio: Option<[f64; 3]>,
}

impl Flow {
    pub(super) fn frictionless(flow: &PotentialFlow, angles: &[f64]) -> Self {
        let incidences: Vec<f64> = angles.iter().map(|angle| angle.to_radians()).collect();
        Self::Frictionless(Frictionless {
            slope: flow.slope_per_radian(),
            zero_lift: flow.zero_lift(),
            bucket: Bucket::without_friction(flow, &incidences),
            points: std::iter::zip(angles, incidences).map(|(angle, i)| (*angle, flow.at(i))).collect(),
        })
    }
}

impl Curve {
    pub(super) fn viscous(&self) -> Option<&LiftCurve> {
        match &self.flow {
            Flow::Viscous(curve) => Some(curve),
            Flow::Frictionless(_) => None,
        }
    }

    pub(super) fn rows<'a>(&'a self) -> Vec<Row<'a>> {
        let hinge = |pressure: &[PressurePoint]| hinge_moment(pressure, self.axis?);
        match &self.flow {
            Flow::Viscous(curve) => {
                let at = |s: &'a ViscousSolution| At { hinge_moment: hinge(&s.pressure), ..At::viscous(s) };
                let row = |point: &'a CurvePoint| Row {
                    angle: in_degrees(point.incidence),
                    at: point.solution.as_ref().map(at),
                };
                curve.points.iter().map(row).collect()
            }
            Flow::Frictionless(curve) => {
                let at = |s: &'a Solution| At { hinge_moment: hinge(&s.pressure), ..At::frictionless(s) };
                curve.points.iter().map(|(angle, s)| Row { angle: *angle, at: Some(at(s)) }).collect()
            }
        }
    }

    /// Moment about the flap's hinge in Nm on each metre of span.
    pub(super) fn hinge_force(&self, at: &At<'_>, scale: Scale) -> Option<f64> {
        let (axis, tail) = (self.axis?, at.pressure.first()?);
        // The coefficient is by the chord of the flap.
        let share = axis.distance(Point::new(tail.x, tail.y));
        Some(scale.moment * share * share * at.hinge_moment?)
    }

    /// The amplification exponent; not a number without friction.
    pub(super) fn amplification(&self) -> f64 {
        self.viscous().map_or(f64::NAN, |curve| curve.conditions.amplification)
    }

    pub(super) fn gaps(&self) -> usize {
        self.viscous().map_or(0, |curve| curve.points.len() - curve.converged())
    }

    pub(super) fn bucket(&self) -> Bucket {
        match &self.flow {
            Flow::Viscous(curve) => Bucket::of(curve),
            Flow::Frictionless(curve) => curve.bucket.clone(),
        }
    }

    pub(super) fn summary(&self) -> Summary {
        match &self.flow {
            Flow::Viscous(curve) => {
                let straight = curve.slope_and_zero_lift();
                let ratio = |s: &&ViscousSolution| s.cl / s.cd;
                let best = curve.solutions().max_by(|a, b| ratio(a).total_cmp(&ratio(b)));
                Summary {
                    slope_per_degree: straight.map(|(slope, _)| slope.to_radians()),
                    zero_lift: straight.map(|(_, zero)| zero.to_degrees()),
                    greatest_lift: curve.greatest_lift().map(|(cl, at)| [cl, at.to_degrees()]),
                    least_drag: curve.least_drag().map(|s| [s.cd, s.cl, in_degrees(s.incidence)]),
                    best_ratio: best.map(|s| [ratio(&s), s.cl, in_degrees(s.incidence)]),
                }
            }
            Flow::Frictionless(curve) => Summary {
                slope_per_degree: Some(curve.slope.to_radians()),
                zero_lift: Some(curve.zero_lift.to_degrees()),
                greatest_lift: None,
                least_drag: None,
                best_ratio: None,
            },
        }
    }
}

/// Incidence in degrees, without the dust of its way through radians.
fn in_degrees(incidence: f64) -> f64 {
    (incidence.to_degrees() * 1e9).round() / 1e9
}
