//! The aids that shape the parts: templates, patterns, masks; laid out on paper and printer beds.

mod cradle;
mod drawing;
mod engrave;
mod flap_picture;
mod mask;
mod paper;
mod pattern;
mod plan_marks;
mod plate;
mod rail;
mod router;
mod section_picture;
mod stock;
mod strokes;
mod trial;

pub use cradle::{Cradle, CradleSection};
pub use drawing::{Drawing, Label, Line, Role};
pub use engrave::engrave;
pub use flap_picture::flap_picture;
pub use mask::{Half, Mask, MaskMarks, MaskPiece, MaskSettings};
pub use paper::{Page, PaperSettings, single_page, tiled};
pub(crate) use pattern::turn;
pub use pattern::{part_template, planform_pattern, station_template};
pub use plan_marks::{PlanMark, mark_on_plan};
pub use plate::PlatePiece;
pub use rail::{RailSettings, rail};
pub use router::{Corners, InsideRadius, RouterSettings, routed, tightest_inside};
pub use section_picture::{section_numbers, section_picture};
pub use stock::{Layout, StockPiece, StockSettings, StockSheet, on_stock};
pub use trial::{Fit, along as points_along, close_mask, lay_in_cradle};

/// The title every aid of one design carries, so that two revisions are never mixed on the bench.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Stamp {
    /// Name of the design.
    pub design: String,
    /// Its fingerprint.
    pub fingerprint: String,
}

impl std::fmt::Display for Stamp {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(f, "{}  {}", self.design, self.fingerprint)
    }
}
