//! The section a command line names.

use std::path::Path;

use clap::ValueEnum;
use plankform::section::{Section, TrailingEdge};

use super::failure::Failure;

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(super) enum TrailingEdgeWord {
    /// Open, as the published equation leaves it
    Published,
    /// Brought to a sharp edge
    Closed,
}

impl From<TrailingEdgeWord> for TrailingEdge {
    fn from(word: TrailingEdgeWord) -> Self {
        match word {
            TrailingEdgeWord::Published => Self::Published,
            TrailingEdgeWord::Closed => Self::Closed,
        }
    }
}

/// The section arguments that several verbs share.
#[derive(Debug, clap::Args)]
pub(super) struct SectionSource {
    /// Designation of the section, such as "NACA 4412" or "NACA 23012"
    #[arg(value_name = "SECTION", num_args = 1..=2, required = true)]
    section: Vec<String>,
    /// How the trailing edge is finished
    #[arg(long, value_name = "FINISH", default_value = "published")]
    trailing_edge: TrailingEdgeWord,
}

impl SectionSource {
    pub(super) fn section(&self) -> Result<Section, Failure> {
        // A designation typed without quotes comes as two words.
        let section = self.section.join(" ");
        if Path::new(&section).is_file() {
            return Err(Failure::Input(format!(
                "{} is a file: sections are taken by designation so far, section files are still to come",
                section
            )));
        }
        Section::from_designation(&section, self.trailing_edge.into()).map_err(Failure::input)
    }
}
