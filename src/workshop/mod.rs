//! The aids that shape the parts: templates, patterns, masks; laid out on paper and printer beds.

mod drawing;
mod flap_picture;
mod mask;
mod paper;
mod pattern;
mod plan_marks;
mod section_picture;
mod strokes;

pub use drawing::{Drawing, Label, Line, Role};
pub use flap_picture::flap_picture;
pub use mask::{Half, Mask, MaskMarks, MaskSettings};
pub use paper::{Page, PaperSettings, single_page, tiled};
pub(crate) use pattern::turn;
pub use pattern::{part_template, planform_pattern, station_template};
pub use plan_marks::{PlanMark, mark_on_plan};
pub use section_picture::{section_numbers, section_picture};

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
