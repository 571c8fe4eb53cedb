//! A foil section at unit chord: nose at the origin, trailing edge at x = 1, y upwards.

pub mod coordinates;
mod designation;
mod equations;
mod error;
mod expression;
mod file;
mod finish;
mod flap;
mod form;
mod laid;
mod mean_line;
mod numbers;
mod thickness;
mod uniform_load;
mod upright;
mod work;
mod working;

pub use coordinates::{CoordinateReport, FittedSurfaces};
pub use equations::{EquationError, Equations, Piece};
pub use error::SectionError;
pub use expression::{
    DEEPEST as DEEPEST_EXPRESSION, Expression, ExpressionError, LONGEST as LONGEST_EXPRESSION, Taylor,
};
pub use file::{Beside, LARGEST_SECTION_FILE, SectionFileError, names_a_file};
pub use finish::Finish;
pub use flap::{Flap, FlapSurface, HingeHeight};
pub use mean_line::{MeanLine, Ordinate};
pub use numbers::{Numbers, SecondMoments, Turn};
pub use thickness::{ThicknessForm, TrailingEdge};
pub use uniform_load::UniformLoad;
pub use work::Work;

use std::sync::Arc;

use crate::geometry::{BezPath, Curve, Jet, Point, fitted_outline, height_at};
use crate::problems::FileErrors;
use flap::Flapped;
use form::{Blend, Form};
use laid::Laid;
use upright::Upright;

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

/// A section of any making: a thickness laid off across a mean line, two surfaces written as
/// equations or fitted to points, a blend of two others, each with what was changed of it.
///
/// As a [`Curve`] its parameter runs from -1 (upper trailing edge) over 0 (nose) to 1 (lower
/// trailing edge), anticlockwise. Its square is the station along the mean line or the chord, so
/// that the round nose is smooth in it; a deflected flap stretches it behind the hinge.
#[derive(Debug, Clone, PartialEq)]
pub struct Section {
    name: String,
    form: Form,
    /// The word for its trailing edge.
    edge: &'static str,
    remarks: Vec<String>,
}

impl Section {
    /// A section from a mean line and a thickness form, laid off across it.
    ///
    /// # Errors
    /// When a surface folds over itself because the mean line bends too sharply.
    pub fn new(name: String, mean_line: MeanLine, thickness: ThicknessForm) -> Result<Self, SectionError> {
        let edge = thickness.edge_word();
        let form = Form::Laid(Laid { mean_line, thickness, rounds: Vec::new() });
        Self { name, form, edge, remarks: Vec::new() }.without_folds()
    }

    /// A section from expressions for the heights of its upper and lower surface over x, all in
    /// chords.
    ///
    /// # Errors
    /// The surface (upper or lower), the piece, the place and what is wrong.
    pub fn from_surfaces(
        name: String,
        upper: Equations,
        lower: Equations,
    ) -> Result<Self, (Side, EquationError)> {
        let made = Upright::from_equations(upper, lower);
        let upright = made.map_err(|(i, error)| (if i == 0 { Side::Upper } else { Side::Lower }, error))?;
        Ok(Self::upright(name, upright, Vec::new()))
    }

    fn upright(name: String, upright: Upright, remarks: Vec<String>) -> Self {
        let form = Form::Upright(upright);
        let edge = edge_of(&form);
        Self { name, form, edge, remarks }
    }

    /// A mixture of two sections, point by point at the same root of the station: `weight` of the
    /// second, 0 to 1.
    ///
    /// # Errors
    /// When the weight is none, or the mixture crosses itself.
    pub fn blend(name: String, first: &Self, second: &Self, weight: f64) -> Result<Self, SectionError> {
        if !(0.0..=1.0).contains(&weight) {
            return Err(SectionError::BlendWeight { weight });
        }
        let of = [first.form.clone(), second.form.clone()];
        let form = Form::Blend(Arc::new(Blend { of, weight }));
        let remarks = first.remarks.iter().chain(&second.remarks).cloned().collect();
        let edge = edge_of(&form);
        let blend = Self { name, form, edge, remarks };
        blend.refuse_crossing_surfaces()?;
        Ok(blend)
    }

    /// With a flap deflected. What [`Section::numbers`] says of thickness, camber and nose is of
    /// the section with the flap straight.
    ///
    /// # Errors
    /// When hinge or angle are out of bounds, or the surfaces do not meet.
    pub fn flapped(&self, flap: Flap) -> Result<Self, SectionError> {
        let name =
            format!("{}, flap {}° at {:.0} %", self.name, flap::degrees_of(flap.angle), 100.0 * flap.hinge);
        let form = Form::Flapped(Arc::new(Flapped::new(self.form.clone(), flap, &self.name)?));
        let flapped = Self { name, form, ..self.clone() };
        flapped.refuse_crossing_surfaces()?;
        Ok(flapped)
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

    /// A section from the text of a section file that names no others; `file_name` is only repeated
    /// in messages.
    ///
    /// # Errors
    /// What is wrong with the file, each with its place and what would be right.
    pub fn from_file_text(text: &str, file_name: &str) -> Result<Self, FileErrors> {
        let nothing = |_: &str, _: usize| Err(std::io::Error::from(std::io::ErrorKind::NotFound));
        file::parse(text, file_name, &Beside::new(&nothing))
    }

    /// A section through points.
    fn fitted(name: String, traced: coordinates::Traced) -> Self {
        let remarks = traced.report.lines();
        Self::upright(name, Upright::fitted(traced.surfaces), remarks)
    }

    /// The same under another name.
    #[must_use]
    pub fn named(self, name: String) -> Self {
        Self { name, ..self }
    }

    /// Designation, or what its maker calls it.
    #[must_use]
    pub fn name(&self) -> &str {
        &self.name
    }

    /// The word for its trailing edge: `published`, `closed` or `open`.
    #[must_use]
    pub fn edge_word(&self) -> &'static str {
        self.edge
    }

    /// What was done to bring it about that its maker should know, such as how points were placed
    /// and how close the curve lies to them; a sentence each.
    #[must_use]
    pub fn remarks(&self) -> &[String] {
        &self.remarks
    }

    /// The points of the upper and the lower surface at parameter `root` of both, 0 (nose) to 1,
    /// with any flap straight. For the published families they lie across the mean line at
    /// x = `root`², and midway between them is that line.
    #[must_use]
    pub fn pair(&self, root: f64) -> [Point; 2] {
        let whole = self.form.unflapped();
        [-root, root].map(|t| whole.jet(t).point)
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

    fn without_folds(self) -> Result<Self, SectionError> {
        match self.form.fold() {
            Some((side, x)) => Err(SectionError::Folds { name: self.name, side, percent: 100.0 * x }),
            None => Ok(self),
        }
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
}

/// The word for the trailing edge of a form that is no published one.
fn edge_of(form: &Form) -> &'static str {
    let gap = form.jet(-1.0).point.distance(form.jet(1.0).point);
    if gap > 1e-9 { "open" } else { "closed" }
}

impl Curve for Section {
    fn jet(&self, t: f64) -> Jet {
        self.form.jet(t)
    }

    fn breaks(&self) -> Vec<f64> {
        self.form.breaks()
    }
}
