//! A whole part, foil half or strut: its sections along the span, its reserves under load cases, and the
//! plies that would mend it.

use std::ops::RangeInclusive;

use super::{
    BeamResult, BeamStation, Cantilever, Criteria, Layer, LoadCase, Mode, Provenance, Reserve, SectionBuild,
    SectionStiffness, SkinPly, StrengthError, UNLOADED, reserves,
};
use crate::section::Side;

/// A section of a part.
#[derive(Debug, Clone, PartialEq)]
pub struct MemberStation {
    /// Place, mm from the root.
    pub at: f64,
    /// What it is made of there.
    pub build: SectionBuild,
}

/// A part that is held at its root.
///
/// Stress is looked at in the stations only: set them where a ply, a flap or a cut-out begins and ends,
/// and where loads act.
#[derive(Debug, Clone, PartialEq)]
pub struct Member {
    stations: Vec<MemberStation>,
    sections: Vec<SectionStiffness>,
    beam: Cantilever,
}

/// Reserves at one station under one case.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct StationReserves {
    /// Place, mm from the root.
    pub at: f64,
    /// Of the skin, against wrinkling, of the core.
    pub reserves: [Reserve; 3],
}

/// A part under one case.
#[derive(Debug, Clone, PartialEq)]
pub struct CaseResult {
    /// Name of the case.
    pub name: String,
    /// Its load factor, which is in all results.
    pub factor: f64,
    /// Shear, moment, torque, deflection and twist.
    pub beam: BeamResult,
    /// Reserves along the span, root to tip.
    pub stations: Vec<StationReserves>,
    /// Buckling load over the push along the part; [`UNLOADED`] without one.
    pub buckling: f64,
}

/// The least reserve of a part.
#[derive(Debug, Clone, PartialEq)]
pub struct Least {
    /// Name of the case.
    pub case: String,
    /// Place, mm from the root.
    pub at: f64,
    /// How much, against what and where on the chord.
    pub reserve: Reserve,
}

/// Plies that mend a part.
#[derive(Debug, Clone, PartialEq)]
pub struct Cure {
    /// How many more of the candidate on each surface; nought when none is needed.
    pub plies: usize,
    /// From where to where along the span they have to reach at least, mm.
    pub span: RangeInclusive<f64>,
    /// The least reserve of the part with them.
    pub least: Least,
}

/// Most plies that are tried as a cure.
const MOST_PLIES: usize = 12;

impl Member {
    /// A part from its stations, the first at the root.
    ///
    /// # Errors
    /// When the stations are not in order, or a section cannot be worked out.
    pub fn new(stations: Vec<MemberStation>) -> Result<Self, StrengthError> {
        let sections: Vec<SectionStiffness> = stations
            .iter()
            .map(|station| SectionStiffness::of(&station.build, station.at))
            .collect::<Result<_, _>>()?;
        Self::assembled(stations, sections)
    }

    fn assembled(
        stations: Vec<MemberStation>,
        sections: Vec<SectionStiffness>,
    ) -> Result<Self, StrengthError> {
        let of = |(station, section): (&MemberStation, &SectionStiffness)| BeamStation {
            at: station.at,
            bending: [section.bending_across, section.bending_along],
            torsion: section.torsion,
            shear_centre: section.shear_centre,
            shear: None,
        };
        let beam = Cantilever::new(stations.iter().zip(&sections).map(of).collect())?;
        Ok(Self { stations, sections, beam })
    }

    /// The sections from root to tip.
    #[must_use]
    pub fn sections(&self) -> &[SectionStiffness] {
        &self.sections
    }

    /// The beam that they make.
    #[must_use]
    pub fn beam(&self) -> &Cantilever {
        &self.beam
    }

    /// Weight of the part, kg: sections in straight lines between stations.
    #[must_use]
    pub fn mass(&self) -> f64 {
        let bit = |(a, b): (usize, usize)| {
            let length = self.stations[b].at - self.stations[a].at;
            0.5e-3 * length * (self.sections[a].mass + self.sections[b].mass)
        };
        (1..self.stations.len()).map(|i| bit((i - 1, i))).sum()
    }

    /// Names of the materials whose values were not tested, each once: say so beside every result.
    #[must_use]
    pub fn untested(&self) -> Vec<String> {
        let mut names: Vec<String> = Vec::new();
        let mut add = |name: &str, provenance: Provenance| {
            if provenance != Provenance::Tested && !names.iter().any(|known| known == name) {
                names.push(name.to_owned());
            }
        };
        for station in &self.stations {
            let web = station.build.flap.iter().flat_map(|flap| &flap.web);
            for layer in station.build.plies.iter().map(|ply| &ply.layer).chain(web) {
                add(&layer.material.name, layer.material.provenance);
            }
            add(&station.build.core.name, station.build.core.provenance);
        }
        names
    }

    /// The part under a case.
    ///
    /// A push along the part magnifies the bending by 1 / (1 - P/Pe), Pe the buckling load (Timoshenko and
    /// Gere, "Theory of Elastic Stability", 1961, chapter 1); where P reaches Pe the buckling reserve
    /// falls below one and the bending is left as it is.
    ///
    /// Not a certification: use tested material values; local codes and licensed practice come first.
    ///
    /// # Errors
    /// When a load does not lie on the part, or the criteria are impossible.
    pub fn under(&self, case: &LoadCase, criteria: Criteria) -> Result<CaseResult, StrengthError> {
        criteria.check()?;
        let beam = self.beam.under(case)?;
        let push = beam.root().compression;
        let buckling = if push > 0.0 { (self.beam.buckling_load() / push).min(UNLOADED) } else { UNLOADED };
        let magnified = if push > 0.0 && buckling > 1.0 { 1.0 / (1.0 - 1.0 / buckling) } else { 1.0 };
        let at = |(station, section): (&MemberStation, &SectionStiffness)| {
            let mut node = beam.near(station.at);
            node.moment = node.moment.map(|moment| moment * magnified);
            StationReserves { at: station.at, reserves: reserves(section, &node, criteria) }
        };
        let stations = self.stations.iter().zip(&self.sections).map(at).collect();
        Ok(CaseResult { name: case.name.clone(), factor: case.factor, beam, stations, buckling })
    }

    /// The least reserve of all cases.
    ///
    /// # Errors
    /// As [`Member::under`], and without cases.
    pub fn least(&self, cases: &[LoadCase], criteria: Criteria) -> Result<Least, StrengthError> {
        let mut least: Option<Least> = None;
        for case in cases {
            let own = self.under(case, criteria)?.least();
            if least.as_ref().is_none_or(|known| own.reserve.reserve < known.reserve.reserve) {
                least = Some(own);
            }
        }
        least.ok_or(StrengthError::NoCases)
    }

    /// The part with more plies laid over both surfaces, full chord, within a stretch of the span.
    ///
    /// # Errors
    /// When a section cannot be worked out with them.
    pub fn with_plies(
        &self,
        ply: &Layer,
        count: usize,
        span: &RangeInclusive<f64>,
    ) -> Result<Self, StrengthError> {
        let mut stations = self.stations.clone();
        let mut sections = self.sections.clone();
        for (station, section) in stations.iter_mut().zip(&mut sections) {
            if count > 0 && span.contains(&station.at) {
                station.build.plies.extend((0..count).map(|_| SkinPly::all_round(ply.clone())));
                *section = SectionStiffness::of(&station.build, station.at)?;
            }
        }
        Self::assembled(stations, sections)
    }

    /// The fewest more plies of a kind, on both surfaces, with which the least reserve of all cases is at
    /// least `asked`, and the shortest stretch of the span, from station to station, that they need.
    ///
    /// Found by trying: one ply more over the whole span until that does, then ends drawn in from the tip
    /// and from the root as long as it holds. The ply ends one station beyond the last that needs it, since
    /// the reserve falls between the two. The finished outline stays: more plies take from the core.
    ///
    /// # Errors
    /// When up to twelve do not do; then the best that was found is named.
    pub fn cure(
        &self,
        cases: &[LoadCase],
        criteria: Criteria,
        ply: &Layer,
        asked: f64,
    ) -> Result<Cure, StrengthError> {
        if !(asked > 0.0 && asked.is_finite()) {
            return Err(StrengthError::Asked { what: "the reserve asked for", value: asked });
        }
        let least = self.least(cases, criteria)?;
        if least.reserve.reserve >= asked {
            return Ok(Cure { plies: 0, span: 0.0..=0.0, least });
        }
        let mut best = least;
        for plies in 1..=MOST_PLIES {
            let whole = self.with_plies(ply, plies, &(0.0..=self.beam.reach()))?;
            let least = whole.least(cases, criteria)?;
            if least.reserve.reserve >= asked {
                return self.shortest(&whole, cases, criteria, (ply, plies), asked);
            }
            if least.reserve.reserve > best.reserve.reserve {
                best = least;
            }
        }
        let (best, at, what) = (best.reserve.reserve, best.at, best.reserve.mode.words());
        Err(StrengthError::NoCure { tried: MOST_PLIES, asked, best, at, what })
    }

    /// Draws in the ends of a cure over the whole span.
    fn shortest(
        &self,
        whole: &Self,
        cases: &[LoadCase],
        criteria: Criteria,
        (ply, plies): (&Layer, usize),
        asked: f64,
    ) -> Result<Cure, StrengthError> {
        let last = self.stations.len() - 1;
        // The plied sections are known already: a stretch takes them from the whole.
        let over = |from: usize, to: usize| {
            let pick = |i: usize| if (from..=to).contains(&i) { whole } else { self };
            let stations = (0..=last).map(|i| pick(i).stations[i].clone()).collect();
            let sections = (0..=last).map(|i| pick(i).sections[i].clone()).collect();
            Self::assembled(stations, sections)?.least(cases, criteria)
        };
        let holds = |from: usize, to: usize| Ok(over(from, to)?.reserve.reserve >= asked);
        let (mut from, mut to) = (0, last);
        while to > from && holds(from, to - 1)? {
            to -= 1;
        }
        while from < to && holds(from + 1, to)? {
            from += 1;
        }
        let span = self.stations[from.saturating_sub(1)].at..=self.stations[(to + 1).min(last)].at;
        // With the stations at its ends the part is another: its own reserve counts.
        let least = self.with_plies(ply, plies, &span)?.least(cases, criteria)?;
        if least.reserve.reserve >= asked {
            return Ok(Cure { plies, span, least });
        }
        Ok(Cure { plies, least: whole.least(cases, criteria)?, span: 0.0..=self.beam.reach() })
    }
}

impl CaseResult {
    /// The least reserve of this case.
    #[must_use]
    pub fn least(&self) -> Least {
        // Buckling shows at the root, where its bending is greatest.
        let whole = Reserve { reserve: self.buckling, mode: Mode::Buckling, x: 0.0, side: Side::Upper };
        let mut least = Least { case: self.name.clone(), at: 0.0, reserve: whole };
        for station in &self.stations {
            for reserve in station.reserves {
                if reserve.reserve < least.reserve.reserve {
                    (least.at, least.reserve) = (station.at, reserve);
                }
            }
        }
        least
    }
}
