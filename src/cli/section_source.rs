//! The section a command line names.

use std::path::Path;

use clap::ValueEnum;
use plankform::section::{LARGEST_SECTION_FILE, Section, TrailingEdge};

use super::design_source::{in_colour, text_of};
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
    /// Designation of the section, such as "NACA 4412", or a section file, such as "mine.toml"
    #[arg(value_name = "SECTION", num_args = 1..=2, required = true)]
    section: Vec<String>,
    /// How the trailing edge of a designation is finished [default: published]
    #[arg(long, value_name = "FINISH")]
    trailing_edge: Option<TrailingEdgeWord>,
}

impl SectionSource {
    pub(super) fn section(&self) -> Result<Section, Failure> {
        // A designation typed without quotes comes as two words.
        let section = self.section.join(" ");
        let path = Path::new(&section);
        // A designation has no ending, and a path to a section file always has.
        if path.extension().is_some_and(|ending| ending.eq_ignore_ascii_case("toml")) || path.is_file() {
            if self.trailing_edge.is_some() {
                return Err(Failure::Input(
                    "the equations of a section file say how its trailing edge ends: leave out --trailing-edge"
                        .to_owned(),
                ));
            }
            return from_file(path);
        }
        Section::from_designation(
            &section,
            self.trailing_edge.map_or(TrailingEdge::Published, TrailingEdge::from),
        )
        .map_err(Failure::input)
    }
}

fn from_file(path: &Path) -> Result<Section, Failure> {
    let text = text_of(path, LARGEST_SECTION_FILE, "a section file")?;
    Section::from_file_text(&text, &path.display().to_string())
        .map_err(|errors| Failure::Input(errors.render(in_colour())))
}
