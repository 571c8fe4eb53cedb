//! The laminate: what is laid over the core, and how thick it makes the skin where.

use std::ops::RangeInclusive;

use crate::section::Side;

/// What a ply is made of.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PlyMaterial {
    /// Weight of the dry cloth, g/m².
    pub areal_weight: f64,
    /// Density of its fibre, kg/m³.
    pub fibre_density: f64,
    /// Density of the resin, kg/m³.
    pub resin_density: f64,
    /// Share of the fibre in the cured ply's volume, 0 to 1.
    pub fibre_share: f64,
}

impl PlyMaterial {
    /// Thickness of the cured ply in mm: the volume of its fibre over their share. Common to all
    /// handbooks of laminates; it leaves out voids.
    #[must_use]
    pub fn thickness(&self) -> f64 {
        // g/m² over kg/m³ is a thousandth of a mm.
        self.areal_weight / (self.fibre_density * self.fibre_share)
    }

    /// Density of the cured ply, kg/m³: the rule of mixtures.
    #[must_use]
    pub fn density(&self) -> f64 {
        self.fibre_share * self.fibre_density + (1.0 - self.fibre_share) * self.resin_density
    }

    /// Weight of the cured ply with its resin, kg/m².
    #[must_use]
    pub fn cured_weight(&self) -> f64 {
        self.thickness() * 1e-3 * self.density()
    }
}

/// Which surfaces a ply covers.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Covers {
    /// Both, round the nose in one.
    Both,
    /// The upper one.
    Upper,
    /// The lower one.
    Lower,
}

/// One layer of the laminate.
#[derive(Debug, Clone, PartialEq)]
pub struct Ply {
    /// Thickness when cured, mm.
    pub thickness: f64,
    /// Surfaces that it covers.
    pub covers: Covers,
    /// From where to where along the span, mm from the root.
    pub span: RangeInclusive<f64>,
    /// From where to where along the chord, fractions of it.
    pub chord: RangeInclusive<f64>,
}

/// The plies, from the core outwards, and what is put over them.
#[derive(Debug, Clone, PartialEq)]
pub struct Laminate {
    /// The plies.
    pub plies: Vec<Ply>,
    /// Filler and paint over all, mm.
    pub finish: f64,
    /// Over how much of the chord, in mm, the recess for a ply rises at an edge of it that lies on a
    /// surface, so that core and cloth take no step.
    pub rise: f64,
}

impl Laminate {
    /// Thickness of the skin in mm at `x` of a chord (both mm) at `at` mm from the root, and its
    /// slope by x.
    ///
    /// A ply is counted in full between its edges; at an edge within the surface it rises over
    /// [`Laminate::rise`] inside of it, by 3 s² - 2 s³. A ply on both sides goes round the nose.
    #[must_use]
    pub fn thickness(&self, side: Side, at: f64, x: f64, chord: f64) -> [f64; 2] {
        let covered = |ply: &&Ply| {
            let sided = match ply.covers {
                Covers::Both => true,
                Covers::Upper => side == Side::Upper,
                Covers::Lower => side == Side::Lower,
            };
            sided && ply.span.contains(&at)
        };
        let mut sum = [self.finish, 0.0];
        for ply in self.plies.iter().filter(covered) {
            let (from, to) = (ply.chord.start() * chord, ply.chord.end() * chord);
            let round_the_nose = *ply.chord.start() <= 0.0 && ply.covers == Covers::Both;
            let front = if round_the_nose { [1.0, 0.0] } else { self.rises(x - from) };
            let back = if *ply.chord.end() >= 1.0 { [1.0, 0.0] } else { self.rises(to - x) };
            sum[0] += ply.thickness * front[0] * back[0];
            sum[1] += ply.thickness * (front[1] * back[0] - front[0] * back[1]);
        }
        sum
    }

    /// The skin of one side alone.
    #[must_use]
    pub fn of_side(&self, side: Side) -> Self {
        let covers = if side == Side::Upper { Covers::Upper } else { Covers::Lower };
        let on_it = |ply: &&Ply| ply.covers == Covers::Both || ply.covers == covers;
        let finish = Ply { thickness: self.finish, covers, span: f64::MIN..=f64::MAX, chord: 0.0..=1.0 };
        let plies = self.plies.iter().filter(on_it).map(|ply| Ply { covers, ..ply.clone() });
        Self { plies: plies.chain([finish]).collect(), finish: 0.0, rise: self.rise }
    }

    /// Share of a ply's thickness at a distance inside of its edge, and its slope.
    fn rises(&self, inside: f64) -> [f64; 2] {
        if inside <= 0.0 {
            return [0.0, 0.0];
        }
        if inside >= self.rise {
            return [1.0, 0.0];
        }
        let s = inside / self.rise;
        [s * s * (3.0 - 2.0 * s), 6.0 * s * (1.0 - s) / self.rise]
    }

    /// Where on the chord the skin's thickness begins or ends to change, in mm.
    #[must_use]
    pub fn edges(&self, chord: f64) -> Vec<f64> {
        let of_ply = |ply: &Ply| {
            let (from, to) = (ply.chord.start() * chord, ply.chord.end() * chord);
            [from, from + self.rise, to - self.rise, to]
        };
        let mut edges: Vec<f64> =
            self.plies.iter().flat_map(of_ply).filter(|x| *x > 0.0 && *x < chord).collect();
        edges.sort_by(f64::total_cmp);
        edges.dedup();
        edges
    }
}
