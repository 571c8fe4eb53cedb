//! Flow with friction at each station of a design: lift, drag and cavitation at its own Reynolds
//! number, with a smooth and with a rough nose.

use super::PackError;
use crate::design::Design;
use crate::flow::{
    Bucket, Conditions, LiftCurve, NoseFinish, Panelling, Salinity, Viscous, ViscousSolution, Water,
    side_by_side,
};
use crate::section::Section;

/// The curves of one section at one chord.
pub(super) struct StationCurves<'a> {
    /// Stations that have both, mm from the root.
    pub(super) stations: Vec<f64>,
    /// Chord, mm.
    pub(super) chord: f64,
    pub(super) section: &'a Section,
    /// With free transition.
    pub(super) smooth: LiftCurve,
    /// With the layer made turbulent at the nose, as dirt, wear or a poor finish make it.
    pub(super) rough: LiftCurve,
}

/// What a section does at a lift coefficient between two points of its curve.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct AtLift {
    /// Radians.
    pub(super) incidence: f64,
    pub(super) cd: f64,
    pub(super) cm: f64,
}

/// Where the water starts to boil.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Inception {
    pub(super) finish: NoseFinish,
    /// Greatest suction −cp.
    pub(super) suction: f64,
    /// With the margin asked, m/s.
    pub(super) speed: f64,
}

/// Panels: half of what a single curve takes, for less than a hundredth of its lift.
const PANELS: usize = 120;
/// Incidence to which every curve goes, degrees.
const STALLED: f64 = 16.0;
/// Least step of incidence, degrees, and the most points of a curve.
const LEAST_STEP: f64 = 1.0;
const MOST_POINTS: usize = 25;

/// Stations of one section at one chord.
struct Alike<'a> {
    stations: Vec<f64>,
    chord: f64,
    section: &'a Section,
}

impl<'a> StationCurves<'a> {
    /// The curves of every station, those alike once.
    ///
    /// Tells how many of how many are done.
    pub(super) fn of(
        design: &'a Design,
        water: &Water,
        told: &(dyn Fn(usize, usize) + Sync),
    ) -> Result<Vec<Self>, PackError> {
        let mut alike: Vec<Alike<'a>> = Vec::new();
        for station in &design.stations {
            let (at, chord) = (station.at.mm(), station.chord.mm());
            let known = alike.iter_mut().find(|a| a.chord == chord && *a.section == station.section);
            match known {
                Some(known) => known.stations.push(at),
                None => alike.push(Alike { stations: vec![at], chord, section: &station.section }),
            }
        }
        let flow = |alike: &Alike<'_>| -> Result<Viscous, PackError> {
            Ok(Viscous::new(&Panelling::of(alike.section, PANELS)?)?)
        };
        let flows: Vec<Viscous> = side_by_side(&alike, flow, |_| ()).into_iter().collect::<Result<_, _>>()?;
        let cases: Vec<(&Viscous, Conditions)> = std::iter::zip(&flows, &alike)
            .flat_map(|(flow, alike)| {
                let reynolds = water.reynolds(alike.chord * 1e-3, design.lift.speed);
                let free = Conditions::free(reynolds, design.lift.quietness);
                NoseFinish::BOTH.map(|finish| (flow, finish.on(free)))
            })
            .collect();
        let incidences = incidences(design);
        let sweep =
            |(flow, conditions): &(&Viscous, Conditions)| LiftCurve::sweep(flow, conditions, &incidences);
        let mut swept = side_by_side(&cases, sweep, |done| told(done, cases.len())).into_iter();
        let mut next = || -> Result<LiftCurve, PackError> { Ok(swept.next().ok_or(PackError::Curves)??) };
        let curves = |Alike { stations, chord, section }| {
            Ok(Self { stations, chord, section, smooth: next()?, rough: next()? })
        };
        alike.into_iter().map(curves).collect()
    }

    /// By chord and speed.
    pub(super) fn reynolds(&self) -> f64 {
        self.smooth.conditions.reynolds
    }

    /// Greatest lift coefficient that was found, and whether it is a greatest value and not merely the
    /// end of the range.
    pub(super) fn greatest(curve: &LiftCurve) -> (f64, bool) {
        match curve.greatest_lift() {
            Some((cl, _)) => (cl, true),
            None => (curve.solutions().map(|s| s.cl).fold(f64::NEG_INFINITY, f64::max), false),
        }
    }

    /// Where the water boils first at the design lift, of the smooth and the rough nose; `None` where
    /// neither reaches that lift.
    pub(super) fn cavitates(&self, design: &Design, water: &Water) -> Option<Inception> {
        let range = &design.lift;
        let depth = range.depth.mm() * 1e-3;
        let of = |finish, curve| {
            let suction = Bucket::of(curve).suction_at(range.design)?;
            let speed = water.inception_speed(depth, -suction * (1.0 + range.cavitation_margin))?;
            Some(Inception { finish, suction, speed })
        };
        let both = [(NoseFinish::Smooth, &self.smooth), (NoseFinish::Rough, &self.rough)];
        let found = both.into_iter().filter_map(|(finish, curve)| of(finish, curve));
        found.min_by(|a, b| a.speed.total_cmp(&b.speed))
    }

    /// What it does at a lift coefficient, on the branch below the greatest lift.
    pub(super) fn at_lift(curve: &LiftCurve, cl: f64) -> Option<AtLift> {
        let found: Vec<&ViscousSolution> = curve.solutions().collect();
        found.windows(2).find(|pair| pair[0].cl <= cl && cl <= pair[1].cl).map(|pair| {
            let share = (cl - pair[0].cl) / (pair[1].cl - pair[0].cl).max(f64::MIN_POSITIVE);
            let mix = |value: fn(&ViscousSolution) -> f64| {
                value(pair[0]) + share * (value(pair[1]) - value(pair[0]))
            };
            AtLift { incidence: mix(|s| s.incidence), cd: mix(|s| s.cd), cm: mix(|s| s.cm) }
        })
    }
}

/// The water of a design.
pub(super) fn water(design: &Design) -> Result<Water, PackError> {
    let salinity = if design.lift.sea { Salinity::Sea } else { Salinity::Fresh };
    let celsius = design.lift.temperature;
    Water::at(salinity, celsius).ok_or(PackError::Water { celsius })
}

/// The incidences of the curves, radians: the design's range in steps of a degree or more, and on to
/// where sections of this kind stall, so that the margin is seen.
fn incidences(design: &Design) -> Vec<f64> {
    let (from, to) = (design.lift.from.degrees(), design.lift.to.degrees().max(STALLED));
    let step = design.lift.step.degrees().max(LEAST_STEP).max((to - from) / (MOST_POINTS - 1) as f64);
    let count = ((to - from) / step + 1e-9).floor() as usize;
    (0..=count).map(|i| (from + step * i as f64).to_radians()).collect()
}
