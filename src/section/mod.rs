//! A foil section at unit chord: nose at the origin, trailing edge at x = 1, y upwards.

pub mod coordinates;
mod designation;
mod equations;
mod error;
mod expression;
mod file;
mod mean_line;
mod numbers;
mod thickness;
mod uniform_load;

pub use equations::{EquationError, Equations, Piece};
pub use error::SectionError;
pub use expression::{
    DEEPEST as DEEPEST_EXPRESSION, Expression, ExpressionError, LONGEST as LONGEST_EXPRESSION, Taylor,
};
pub use file::LARGEST_SECTION_FILE;
pub use mean_line::{MeanLine, Ordinate};
pub use numbers::Numbers;
pub use thickness::{ThicknessForm, TrailingEdge};
pub use uniform_load::UniformLoad;

use crate::geometry::{BezPath, Curve, Jet, Point, Vec2, fitted_outline, height_at};
use crate::problems::FileErrors;

/// Stations at which ordinates are tabulated, percent of chord: those of the published tables, with
/// one more near the nose and one near the trailing edge.
pub const ORDINATE_STATIONS: [f64; 20] = [
    0.0, 0.5, 1.25, 2.5, 5.0, 7.5, 10.0, 15.0, 20.0, 25.0, 30.0, 40.0, 50.0, 60.0, 70.0, 80.0, 85.0, 90.0,
    95.0, 100.0,
];

/// One of the two surfaces.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Side {
    /// The suction side at positive incidence.
    Upper,
    /// The other.
    Lower,
}

/// A mean line with a thickness laid off perpendicular to it on both sides.
///
/// As a [`Curve`] its parameter runs from -1 (upper trailing edge) over 0 (nose) to 1 (lower
/// trailing edge), anticlockwise; its square is the station on the mean line, so that the round
/// nose is smooth in it.
#[derive(Debug, Clone, PartialEq)]
pub struct Section {
    name: String,
    mean_line: MeanLine,
    thickness: ThicknessForm,
}

impl Section {
    /// A section from a mean line and a thickness form.
    ///
    /// # Errors
    /// When a surface folds over itself because the mean line bends too sharply.
    pub fn new(name: String, mean_line: MeanLine, thickness: ThicknessForm) -> Result<Self, SectionError> {
        let section = Self { name, mean_line, thickness };
        section.refuse_folds()?;
        Ok(section)
    }

    /// A published section by its designation, such as `NACA 4412` or `NACA 23012`.
    ///
    /// ```
    /// use plankform::section::{Section, Side, TrailingEdge};
    ///
    /// let section = Section::from_designation("NACA 0012", TrailingEdge::Published)?;
    /// // NACA Report 824, appendix: 5.803 % of chord at 40 %.
    /// assert!((section.surface(Side::Upper, 0.4) - 0.05803).abs() < 0.5e-5);
    /// # Ok::<(), plankform::section::SectionError>(())
    /// ```
    ///
    /// # Errors
    /// When the designation is not one, with what would be.
    pub fn from_designation(text: &str, trailing_edge: TrailingEdge) -> Result<Self, SectionError> {
        designation::parse(text, trailing_edge)
    }

    /// A section from the text of a section file; `file_name` is only repeated in messages.
    ///
    /// # Errors
    /// What is wrong with the file, each with its place and what would be right.
    pub fn from_file_text(text: &str, file_name: &str) -> Result<Self, FileErrors> {
        file::parse(text, file_name)
    }

    /// Designation.
    #[must_use]
    pub fn name(&self) -> &str {
        &self.name
    }

    /// The mean line.
    #[must_use]
    pub fn mean_line(&self) -> &MeanLine {
        &self.mean_line
    }

    /// The thickness form.
    #[must_use]
    pub fn thickness_form(&self) -> &ThicknessForm {
        &self.thickness
    }

    /// Height of a surface above the chord line at station `x`, solved on the outline itself.
    ///
    /// Ahead of the nose this is the nose, and behind the end of the surface its end.
    #[must_use]
    pub fn surface(&self, side: Side, x: f64) -> f64 {
        height_at(self, 0.0, if side == Side::Upper { -1.0 } else { 1.0 }, x)
    }

    /// `count` points along the outline (three at least) from the upper trailing edge over the
    /// nose to the lower one, crowded at the nose and the trailing edge.
    #[must_use]
    pub fn points(&self, count: usize) -> Vec<Point> {
        let last = count.max(3) - 1;
        (0..=last)
            .map(|i| {
                let even = 2.0 * i as f64 / last as f64 - 1.0;
                self.jet((std::f64::consts::FRAC_PI_2 * even).sin()).point
            })
            .collect()
    }

    /// The closed outline as cubic Béziers, within `tolerance` (in chords) of the equations.
    #[must_use]
    pub fn outline(&self, tolerance: f64) -> BezPath {
        fitted_outline(self, tolerance)
    }

    /// Refuses surfaces that meet elsewhere than at the nose and the trailing edge.
    fn refuse_crossing_surfaces(&self) -> Result<(), SectionError> {
        let mut points = self.points(801);
        let (first, last) = (points.first().copied(), points.last().copied());
        // A closed edge is one point and not two.
        if let (Some(first), Some(last)) = (first, last)
            && first.distance(last) < 1e-9
        {
            points.pop();
        }
        crate::geometry::polygon::refuse_crossings(&points).map_err(|error| {
            let percent = match error {
                crate::geometry::GeometryError::Crosses { x, .. } => 100.0 * x,
                _ => 0.0,
            };
            SectionError::SurfacesCross { name: self.name.clone(), percent }
        })
    }

    fn refuse_folds(&self) -> Result<(), SectionError> {
        const STATIONS: usize = 2000;
        for i in 1..=STATIONS {
            let root = i as f64 / STATIONS as f64;
            let x = root * root;
            let half = self.thickness.half_at_root(root)[0];
            let line = self.mean_line.at(x);
            // An offset curve turns back where the offset passes the centre of curvature.
            let reach = half * line.second.abs() / (1.0 + line.slope * line.slope).powf(1.5);
            if reach >= 1.0 {
                let side = if line.second < 0.0 { "lower" } else { "upper" };
                return Err(SectionError::Folds { name: self.name.clone(), side, percent: 100.0 * x });
            }
        }
        Ok(())
    }
}

impl Curve for Section {
    fn jet(&self, t: f64) -> Jet {
        let x = t * t;
        let line = self.mean_line.at(x);
        let [half, half_first, half_second] = self.thickness.half_at_root(t.abs());
        // Offset along the normal and its derivatives in t: upper side (t < 0) outwards is up.
        let (offset, offset_first, offset_second) =
            if t < 0.0 { (half, -half_first, half_second) } else { (-half, -half_first, -half_second) };

        let secant2 = 1.0 + line.slope * line.slope;
        let (cos, sin) = (1.0 / secant2.sqrt(), line.slope / secant2.sqrt());
        let (along, normal) = (Vec2::new(cos, sin), Vec2::new(-sin, cos));
        // Angle of the mean line, differentiated by x and then by t.
        let turn_x = line.second / secant2;
        let turn_xx =
            line.third / secant2 - 2.0 * line.slope * line.second * line.second / (secant2 * secant2);
        let turn = turn_x * 2.0 * t;
        let turn_rate = turn_xx * 4.0 * x + turn_x * 2.0;

        Jet {
            point: Point::new(x, line.y) + offset * normal,
            first: Vec2::new(2.0 * t, 2.0 * t * line.slope) + offset_first * normal - offset * turn * along,
            second: Vec2::new(2.0, 2.0 * line.slope + 4.0 * x * line.second) + offset_second * normal
                - 2.0 * offset_first * turn * along
                - offset * (turn_rate * along + turn * turn * normal),
        }
    }

    fn breaks(&self) -> Vec<f64> {
        let mut roots: Vec<f64> = self.mean_line.joints().into_iter().map(f64::sqrt).collect();
        roots.extend(self.thickness.joints().into_iter().map(f64::sqrt));
        roots.push(1.0);
        roots.sort_by(f64::total_cmp);
        roots.dedup();
        let upper = roots.iter().rev().map(|root| -root);
        upper.chain([0.0]).chain(roots.iter().copied()).collect()
    }
}
