//! Sections from coordinates: a table of points, or an outline traced in a drawing.
//!
//! The points are brought into order and to unit chord, and followed by a spline with continuous
//! curvature. Nothing is smoothed in silence: the outline stays within what the digits of the
//! points leave open, and the report says where points stand out and where there are waves.

mod arrange;
mod curves;
mod drawing_text;
mod error;
mod fit;
mod judge;
mod placing;
mod report;
mod spline;
mod table;
mod traced;

pub use drawing_text::LARGEST_DRAWING;
pub use error::CoordinateError;
pub use placing::Placing;
pub use report::{ChordUnit, CoordinateReport, Outlier, Wave};
pub use spline::FittedSurfaces;

use arrange::arrange;

use crate::geometry::{Point, Vec2};
use crate::problems::{FileErrors, Problems, Wrong};

/// The largest table that is read, in bytes.
pub const LARGEST_TABLE: usize = 1_000_000;
/// The fewest points that make a section.
const FEWEST: usize = 10;
/// The most points that are read.
const MOST: usize = 20_000;
/// The greatest tolerance, in chords.
const LOOSEST: f64 = 0.01;

/// A point as it was given.
#[derive(Debug, Clone, Copy)]
struct Given {
    point: Point,
    /// Counted from 1.
    index: usize,
    /// Half a unit of the last digit of x and of y.
    half: Vec2,
}

/// A section from coordinates: both surfaces, the points at unit chord, and what was done.
#[derive(Debug, Clone, PartialEq)]
pub struct Traced {
    /// The surfaces.
    pub surfaces: FittedSurfaces,
    /// The points that were used, at unit chord, from the upper trailing edge over the nose to the
    /// lower one.
    pub points: Vec<Point>,
    /// What was found and done.
    pub report: CoordinateReport,
}

/// A section from the text of a table: two columns, x and y, on as many lines as there are points.
///
/// The columns are divided by blanks, tabs, commas or semicolons. The points go round from the
/// trailing edge in either direction, or each surface stands for itself, from the nose or from the
/// trailing edge. A title may stand ahead of them, comments begin with `#`, `//`, `;`, `!` or `%`.
/// Any unit will do, and any place.
///
/// The outline is the smoothest one that stays within half a unit of the last digit of each point;
/// `tolerance`, in chords, more than 0 and at most 0.01, takes the place of that. `file_name` is
/// only repeated in messages.
///
/// ```
/// use plankform::section::{Section, TrailingEdge, coordinates};
///
/// let section = Section::from_designation("NACA 2412", TrailingEdge::Published)?;
/// let table: String =
///     section.points(81).iter().map(|point| format!("{:.6} {:.6}\n", point.x, point.y)).collect();
/// let traced = coordinates::from_table(&table, "friend.txt", None)?;
/// assert!(traced.report.greatest_distance < 1e-6);
/// assert!(traced.report.waves.is_empty());
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
///
/// # Errors
/// What is wrong with the table, each with its place and what would be right.
pub fn from_table(text: &str, file_name: &str, tolerance: Option<f64>) -> Result<Traced, FileErrors> {
    let table = table::read(text, file_name)?;
    let places = table.places;
    let listing = Listing {
        title: table.title,
        blocks: table.blocks,
        closed: false,
        unit: None,
        resolution: Some(table.unit),
        decimal_comma: table.decimal_comma,
        notes: Vec::new(),
    };
    let traced = listing.trace(tolerance).map_err(|error| {
        let place = error.point().and_then(|index| places.get(index.saturating_sub(1)));
        let mut problems = Problems::default();
        problems.add(place.map_or(0..0, |place| place.0.clone()), Wrong::new(error.to_string()));
        problems.report(text, file_name)
    })?;
    let line = |index: usize| places.get(index.saturating_sub(1)).map(|place| place.1);
    let mut traced = traced;
    for outlier in &mut traced.report.outliers {
        outlier.line = line(outlier.index);
    }
    for wave in &mut traced.report.waves {
        wave.line = line(wave.index);
    }
    Ok(traced)
}

/// A section from the bytes of a drawing: an outline traced in a DXF file in text form.
///
/// The outline is a polyline, with arcs or without, a spline, or lines, arcs, polylines and
/// splines that meet end to end. There must be one, closed or open at the trailing edge. The unit
/// is that of the drawing's header. The outline is followed within `tolerance`, in chords, more
/// than 0 and at most 0.01; where it is `None`, within 1e-5. `file_name` becomes the title where
/// the outline lies on no layer of its own.
///
/// # Errors
/// Why the drawing holds no section, and what would be right.
pub fn from_dxf(bytes: &[u8], file_name: &str, tolerance: Option<f64>) -> Result<Traced, CoordinateError> {
    let outline = traced::read(bytes)?;
    let title = if outline.layer == "0" || outline.layer.is_empty() { file_name } else { &outline.layer };
    let listing = Listing {
        title: Some(crate::units::clipped(title)),
        blocks: vec![outline.points],
        closed: outline.closed,
        unit: Some(outline.unit),
        resolution: None,
        decimal_comma: false,
        notes: outline.notes,
    };
    listing.trace(tolerance.or(Some(traced::DRAWN)))
}

/// Points as a file gave them.
struct Listing {
    title: Option<String>,
    blocks: Vec<Vec<Given>>,
    /// Whether the points are a ring without ends.
    closed: bool,
    /// `None` where it is to be guessed from the size.
    unit: Option<ChordUnit>,
    resolution: Option<f64>,
    decimal_comma: bool,
    notes: Vec<String>,
}

impl Listing {
    fn trace(self, tolerance: Option<f64>) -> Result<Traced, CoordinateError> {
        if let Some(tolerance) = tolerance
            && !(tolerance > 0.0 && tolerance <= LOOSEST)
        {
            return Err(CoordinateError::Tolerance { tolerance });
        }
        let count = self.blocks.iter().map(Vec::len).sum();
        let arranged = arrange(self.blocks, self.closed)?;
        let fit = fit::fit(&arranged.points, arranged.placing, arranged.nose, tolerance)?;
        let (rank, greatest_distance) = fit.furthest();
        let chord = fit.placing.chord();
        let edge_gap = match (fit.places.first(), fit.places.last()) {
            (Some(first), Some(last)) => first.distance(*last),
            _ => 0.0,
        };
        let report = CoordinateReport {
            title: self.title,
            count,
            upper_first: arranged.upper_first,
            blocks: arranged.blocks,
            from_nose: arranged.from_nose,
            decimal_comma: self.decimal_comma,
            unit: self.unit.unwrap_or_else(|| ChordUnit::of_table(chord)),
            placing: fit.placing,
            edge_gap,
            duplicates: arranged.duplicates,
            rounded: arranged.rounded,
            joined: arranged.joined,
            resolution: self.resolution.map(|unit| unit / chord),
            tolerance,
            greatest_distance,
            greatest_at: arranged.points.get(rank).map_or(1, |given| given.index),
            // The search for the smoothest stops within a share of what is allowed.
            reached: fit.greatest_share() <= 1.0 + 1e-3,
            outliers: judge::outliers(&fit, &arranged.points),
            waves: judge::waves(&fit, &arranged.points),
            notes: self.notes,
        };
        Ok(Traced { surfaces: fit.surfaces, points: fit.places, report })
    }
}

impl ChordUnit {
    /// From the length of the chord in a table that says nothing of its unit.
    fn of_table(chord: f64) -> Self {
        match chord {
            0.5..2.0 => Self::Chord,
            95.0..105.0 => Self::Percent,
            _ => Self::AssumedMillimetres,
        }
    }
}
