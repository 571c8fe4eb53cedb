//! The surface between the stations: straight lines from one station's outline to the next, drawn together
//! towards a shaped tip.

use super::{Station, Wing, WingError};
use crate::geometry::{Affine, Curve, Jet, Point, Vec2, parameter_at};

/// The outline of the foil cut square to the span at one place, in the frame of its own chord:
/// nose at the origin, trailing edge on the x axis, millimetres.
#[derive(Debug, Clone)]
pub struct StationShape<'a> {
    /// Distance from the root, mm.
    pub at: f64,
    /// Nose to the middle of the trailing edge, mm.
    pub chord: f64,
    /// Nose-up angle of that chord, radians.
    pub twist: f64,
    /// Nose in the foil's axes: x aft of the root's quarter chord, y up, mm.
    pub nose: Point,
    inner: &'a Station,
    outer: &'a Station,
    /// Share of the outer station.
    weight: f64,
    /// How the tip draws it together.
    tip: Option<Drawn>,
    /// From the foil's axes to the chord's own.
    to_chord: Affine,
}

/// How an outline in the tip is drawn together.
#[derive(Debug, Clone, Copy)]
struct Drawn {
    /// The place that stays, in the foil's axes, and its way for each mm along the span.
    about: Point,
    about_rate: Vec2,
    /// Share of its size that it keeps, and the change of that for each mm.
    share: f64,
    rate: f64,
}

impl Wing {
    /// The shape at `at` mm from the root.
    ///
    /// # Errors
    /// When that is not on the foil.
    pub fn shape_at(&self, at: f64) -> Result<StationShape<'_>, WingError> {
        let off = || WingError::OffTheFoil { at, reach: self.reach() };
        let pair =
            self.stations().windows(2).find(|pair| pair[0].at <= at && at <= pair[1].at).ok_or_else(off)?;
        let (inner, outer) = (&pair[0], &pair[1]);
        let weight = (at - inner.at) / (outer.at - inner.at);

        let mut shape = StationShape {
            at,
            chord: 0.0,
            twist: 0.0,
            nose: Point::ORIGIN,
            inner,
            outer,
            weight,
            tip: None,
            to_chord: Affine::IDENTITY,
        };
        let [share, rate] = self.drawn_together(at, self.chord_by_stations(at));
        if let Some(tip) = self.tip().filter(|_| share != 1.0 || rate != 0.0) {
            let place = |station: &Station| {
                let tail = placed(station, -1.0).point.midpoint(placed(station, 1.0).point);
                placed(station, 0.0).point.lerp(tail, tip.about)
            };
            let (inner_place, outer_place) = (place(inner), place(outer));
            shape.tip = Some(Drawn {
                about: inner_place.lerp(outer_place, weight),
                about_rate: (outer_place - inner_place) / (outer.at - inner.at),
                share,
                rate,
            });
        }
        let nose = shape.lofted(0.0).point;
        let tail = shape.lofted(-1.0).point.midpoint(shape.lofted(1.0).point);
        let chord = tail - nose;
        shape.nose = nose;
        shape.chord = chord.hypot();
        shape.twist = -chord.angle();
        shape.to_chord = Affine::rotate(shape.twist) * Affine::translate(-nose.to_vec2());
        Ok(shape)
    }
}

impl StationShape<'_> {
    /// The nearer of the two stations between which the shape lies.
    #[must_use]
    pub fn nearest_station(&self) -> &Station {
        if self.weight < 0.5 { self.inner } else { self.outer }
    }

    /// The level line in the shape's own frame: the foil's x axis, on which the quarter chord of
    /// every station lies, from `ahead` mm before the nose to `behind` mm after the trailing edge.
    #[must_use]
    pub fn level_line(&self, ahead: f64, behind: f64) -> (Point, Point) {
        let end = self.nose.x + self.chord * self.twist.cos();
        let place = |x: f64| self.to_chord * Point::new(x, 0.0);
        (place(self.nose.x - ahead), place(end + behind))
    }

    /// Section names that make up the shape, one or two.
    #[must_use]
    pub fn section_name(&self) -> String {
        let (inner, outer) = (self.inner.section.name(), self.outer.section.name());
        match self.weight {
            _ if inner == outer => inner.to_owned(),
            0.0 => inner.to_owned(),
            1.0 => outer.to_owned(),
            _ => format!("{inner} to {outer}"),
        }
    }

    /// From the shape's own frame to the foil's axes, x aft and y up.
    #[must_use]
    pub fn to_foil(&self) -> Affine {
        self.to_chord.inverse()
    }

    /// How the outline moves for each mm along the span away from the root, at a parameter held
    /// fast, in the shape's own frame.
    #[must_use]
    pub fn spread(&self, t: f64) -> Vec2 {
        let (inner, outer) = (placed(self.inner, t).point, placed(self.outer, t).point);
        let mut per_mm = (outer - inner) / (self.outer.at - self.inner.at);
        if let Some(tip) = &self.tip {
            let full = inner.lerp(outer, self.weight) - tip.about;
            per_mm = tip.about_rate + tip.rate * full + tip.share * (per_mm - tip.about_rate);
        }
        (Affine::rotate(self.twist) * per_mm.to_point()).to_vec2()
    }

    /// Parameters of the upper and the lower side at `x` mm from the nose along the chord.
    #[must_use]
    pub fn roots_at(&self, x: f64) -> [f64; 2] {
        [-1.0, 1.0].map(|end| parameter_at(self, 0.0, end, x))
    }

    /// In the foil's axes.
    fn lofted(&self, t: f64) -> Jet {
        let (a, b) = (placed(self.inner, t), placed(self.outer, t));
        let mix = |p: Vec2, q: Vec2| p * (1.0 - self.weight) + q * self.weight;
        let full = Jet {
            point: mix(a.point.to_vec2(), b.point.to_vec2()).to_point(),
            first: mix(a.first, b.first),
            second: mix(a.second, b.second),
        };
        self.tip.map_or(full, |tip| Jet {
            point: tip.about + tip.share * (full.point - tip.about),
            first: tip.share * full.first,
            second: tip.share * full.second,
        })
    }
}

impl Curve for StationShape<'_> {
    fn jet(&self, t: f64) -> Jet {
        let jet = self.lofted(t);
        let turned = Affine::rotate(self.twist);
        let turn = |v: Vec2| (turned * v.to_point()).to_vec2();
        Jet { point: self.to_chord * jet.point, first: turn(jet.first), second: turn(jet.second) }
    }

    fn breaks(&self) -> Vec<f64> {
        let mut breaks = self.inner.section.breaks();
        breaks.extend(self.outer.section.breaks());
        breaks.sort_by(f64::total_cmp);
        breaks.dedup_by(|a, b| (*a - *b).abs() < 1e-12);
        breaks
    }
}

/// A station's section at its chord, twist and sweep, in the foil's axes.
fn placed(station: &Station, t: f64) -> Jet {
    let jet = station.section.jet(t);
    // x is aft and z is up, so nose-up turns clockwise.
    let turn = Affine::rotate(-station.twist) * Affine::scale(station.chord);
    let vector = |v: Vec2| (turn * v.to_point()).to_vec2();
    // Sweep and rise are those of the untwisted quarter chord.
    let about = Vec2::new(station.twist_about, 0.0);
    let ahead = (station.twist_about - 0.25) * station.chord;
    Jet {
        point: turn * (jet.point - about) + Vec2::new(station.sweep + ahead, station.rise),
        first: vector(jet.first),
        second: vector(jet.second),
    }
}
