//! Lift curves of a foil's sections over flap angle and Reynolds number, each solved once.
//!
//! Of every section as few Reynolds numbers are solved as its chords and speeds ask for; between them
//! everything goes in straight lines over the logarithm of the Reynolds number.

use crate::design::{Design, FlapKind};
use crate::flow::{Conditions, LiftCurve, Panelling, Viscous, Water, hinge_moment, side_by_side};
use crate::geometry::Point;
use crate::loading::{
    CurvePoint, FlapCurve, GreatestLift, LoadingError, SectionLift, SectionPoint, SectionTable, SpanTables,
};
use crate::pack::PackError;
use crate::section::{Flap, FlapSurface, HingeHeight, Section, Side};

/// Panels, as for the curves of the stations.
const PANELS: usize = 120;
/// Incidences of the curves, degrees; with the flap turned no further than a foil goes that is held by it.
const INCIDENCES: [f64; 11] = [-6.0, -3.0, 0.0, 2.0, 4.0, 6.0, 8.0, 10.0, 12.0, 14.0, 16.0];
const FLAPPED: usize = 9;
/// Greatest ratio of two neighbouring Reynolds numbers that are solved.
const RATIO: f64 = 3.0;

/// A section at one incidence, flap angle and Reynolds number.
#[derive(Debug, Clone, Copy)]
struct Known {
    incidence: f64,
    /// Lift, drag, moment, least pressure, moment about the hinge by the flap's chord.
    values: [f64; 5],
}

/// The curves of one section.
struct OfSection {
    /// Stations that have it: mm from the root, and chord in mm.
    stations: Vec<(f64, f64)>,
    /// Logarithms of the Reynolds numbers.
    nodes: Vec<f64>,
    /// For each flap angle those of each Reynolds number.
    curves: Vec<Vec<Vec<Known>>>,
}

/// The curves of a foil.
pub(super) struct Polars {
    sections: Vec<OfSection>,
    flaps: Vec<f64>,
}

/// The same at one speed.
pub(super) struct AtSpeed {
    /// Lift, drag and moment.
    pub(super) lift: Curves,
    /// Least pressure in the place of lift, moment about the hinge in that of the moment.
    more: SpanTables,
}

/// Lift curves whose greatest lift is the most that is known of each: where a curve still rises at its end,
/// there is more to come, and a margin to stall is at least what it is said to be.
pub(super) struct Curves(SpanTables);

impl SectionLift for Curves {
    fn at(&self, along: f64, incidence: f64, flap: f64) -> SectionPoint {
        self.0.at(along, incidence, flap)
    }

    fn greatest(&self, along: f64, flap: f64) -> Option<GreatestLift> {
        // Straight between these incidences, a curve is highest at one of them.
        let points = INCIDENCES.map(f64::to_radians).into_iter().filter_map(|incidence| {
            let point = self.0.at(along, incidence, flap);
            (!point.beyond).then_some(GreatestLift { incidence, cl: point.cl })
        });
        points.max_by(|a, b| a.cl.total_cmp(&b.cl))
    }
}

impl AtSpeed {
    /// Least pressure coefficient, and the hinge's moment by the flap's chord, tail down.
    pub(super) fn pressure_and_hinge(&self, at: f64, incidence: f64, flap: f64) -> (f64, f64) {
        let SectionPoint { cl, cm, .. } = self.more.at(at, incidence, flap);
        (cl, cm)
    }
}

impl Polars {
    /// Solves them for speeds from the least to the greatest, m/s.
    pub(super) fn of(
        design: &Design,
        water: &Water,
        speeds: [f64; 2],
        flaps: Vec<f64>,
    ) -> Result<Self, PackError> {
        let mut sections: Vec<(&Section, Vec<(f64, f64)>)> = Vec::new();
        for station in &design.stations {
            let place = (station.at.mm(), station.chord.mm());
            match sections.iter_mut().find(|(section, _)| **section == station.section) {
                Some((_, stations)) => stations.push(place),
                None => sections.push((&station.section, vec![place])),
            }
        }
        let nodes = |stations: &[(f64, f64)]| -> Vec<f64> {
            let chord = |pick: fn(f64, f64) -> f64| stations.iter().map(|s| s.1).reduce(pick).unwrap_or(1.0);
            let least = water.reynolds(1e-3 * chord(f64::min), speeds[0]).ln();
            let greatest = water.reynolds(1e-3 * chord(f64::max), speeds[1]).ln();
            let gaps = ((greatest - least) / RATIO.ln()).ceil().max(1.0);
            (0..=gaps as usize).map(|i| least + (greatest - least) * i as f64 / gaps).collect()
        };
        // All together, so that no processor waits for the slowest curve of a section.
        let nodes: Vec<Vec<f64>> = sections.iter().map(|(_, stations)| nodes(stations)).collect();
        let wanted: Vec<(&Section, f64, &[f64])> = sections
            .iter()
            .zip(&nodes)
            .flat_map(|((section, _), nodes)| flaps.iter().map(|&flap| (*section, flap, nodes.as_slice())))
            .collect();
        let solved =
            side_by_side(&wanted, |&(section, flap, nodes)| solve(design, section, flap, nodes), |_| ());
        let mut solved = solved.into_iter();
        let mut of_section = |(stations, nodes)| {
            let curves = solved.by_ref().take(flaps.len()).collect::<Result<_, PackError>>()?;
            Ok(OfSection { stations, nodes, curves })
        };
        let stations = sections.into_iter().map(|(_, stations)| stations);
        let sections = stations.zip(nodes).map(&mut of_section).collect::<Result<_, PackError>>()?;
        Ok(Self { sections, flaps })
    }

    /// Flap angles, radians, in rising order.
    pub(super) fn flaps(&self) -> &[f64] {
        &self.flaps
    }

    /// The curves at a speed in m/s, each station's at its own Reynolds number.
    pub(super) fn at_speed(&self, water: &Water, speed: f64) -> Result<AtSpeed, LoadingError> {
        let mut places: Vec<(f64, SectionTable, SectionTable)> = Vec::new();
        for section in &self.sections {
            for &(at, chord) in &section.stations {
                let number = water.reynolds(1e-3 * chord, speed).ln();
                let after = section.nodes.partition_point(|node| *node < number);
                let outer = after.clamp(1, section.nodes.len() - 1);
                let (a, b) = (section.nodes[outer - 1], section.nodes[outer]);
                let share = if b > a { ((number - a) / (b - a)).clamp(0.0, 1.0) } else { 0.0 };
                let of_flap = |pick: fn(&Known) -> CurvePoint| {
                    let curve = |(flap, curves): (&f64, &Vec<Vec<Known>>)| {
                        let mixed = mixed(&curves[outer - 1], &curves[outer], share);
                        FlapCurve { flap: *flap, points: mixed.iter().map(pick).collect() }
                    };
                    SectionTable::with_flap(self.flaps.iter().zip(&section.curves).map(curve).collect())
                };
                let lift = of_flap(|known| {
                    let [cl, cd, cm, ..] = known.values;
                    CurvePoint { incidence: known.incidence, cl, cd: cd.max(0.0), cm }
                })?;
                let more = of_flap(|known| {
                    let [.., cp_min, hinge] = known.values;
                    CurvePoint { incidence: known.incidence, cl: cp_min, cd: 0.0, cm: hinge }
                })?;
                places.push((at, lift, more));
            }
        }
        places.sort_by(|a, b| a.0.total_cmp(&b.0));
        let lift = SpanTables::new(places.iter().map(|(at, lift, _)| (*at, lift.clone())).collect())?;
        let more = SpanTables::new(places.into_iter().map(|(at, _, more)| (at, more)).collect())?;
        Ok(AtSpeed { lift: Curves(lift), more })
    }
}

/// The curves of a section at a flap angle for logarithms of Reynolds numbers.
fn solve(design: &Design, section: &Section, flap: f64, nodes: &[f64]) -> Result<Vec<Vec<Known>>, PackError> {
    let deflected = design.flap.map(|of| {
        let hinge = f64::midpoint(of.hinge, of.hinge_end);
        let (height, across) = match of.kind {
            FlapKind::LaminateUpper => (HingeHeight::Upper, 1.0),
            FlapKind::LaminateLower => (HingeHeight::Lower, 0.0),
            FlapKind::Pin => (HingeHeight::Middle, 0.5),
        };
        let [upper, lower] = [Side::Upper, Side::Lower].map(|side| section.surface(side, hinge));
        let axis = Point::new(hinge, lower + across * (upper - lower));
        (Flap { hinge, height, angle: flap, surface: FlapSurface::Broken }, axis)
    });
    let shape = match deflected.filter(|_| flap != 0.0) {
        Some((flap, _)) => section.flapped(flap)?,
        None => section.clone(),
    };
    let viscous = Viscous::new(&Panelling::of(&shape, PANELS)?)?;
    let conditions: Vec<Conditions> =
        nodes.iter().map(|node| Conditions::free(node.exp(), design.lift.quietness)).collect();
    let count = if flap == 0.0 { INCIDENCES.len() } else { FLAPPED };
    let incidences = INCIDENCES.map(f64::to_radians);
    let curves = LiftCurve::sweep_on(1, &viscous, &conditions, &incidences[..count])?;
    let known = |curve: &LiftCurve| {
        let point = |s: &crate::flow::ViscousSolution| {
            let hinge = deflected.and_then(|(_, axis)| hinge_moment(&s.pressure, axis)).unwrap_or(0.0);
            Known { incidence: s.incidence, values: [s.cl, s.cd, s.cm, s.cp_min, hinge] }
        };
        curve.solutions().map(point).collect()
    };
    Ok(curves.iter().map(known).collect())
}

/// Two curves mixed, over the incidences that both cover.
fn mixed(a: &[Known], b: &[Known], share: f64) -> Vec<Known> {
    if share == 0.0 || b.is_empty() {
        return a.to_vec();
    }
    let both = INCIDENCES.map(f64::to_radians).into_iter();
    let point = |incidence: f64| {
        let (p, q) = (read(a, incidence)?, read(b, incidence)?);
        Some(Known { incidence, values: std::array::from_fn(|i| p[i] + share * (q[i] - p[i])) })
    };
    both.filter_map(point).collect()
}

/// A curve at an incidence within its ends.
fn read(curve: &[Known], incidence: f64) -> Option<[f64; 5]> {
    const NEAR: f64 = 1e-9;
    let pair = curve
        .windows(2)
        .find(|p| p[0].incidence - NEAR <= incidence && incidence <= p[1].incidence + NEAR)?;
    let share = (incidence - pair[0].incidence) / (pair[1].incidence - pair[0].incidence);
    Some(std::array::from_fn(|i| pair[0].values[i] + share * (pair[1].values[i] - pair[0].values[i])))
}
