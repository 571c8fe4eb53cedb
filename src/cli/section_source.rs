//! The section a command line names.

use std::path::Path;

use plankform::section::{Beside, Finish, Section, SectionFileError, Work};
use plankform::units::Length;

use super::design_source::{in_colour, reader_beside};
use super::failure::Failure;

/// The trailing edge that a command line asks for.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Edge {
    Published,
    Closed,
    /// A share of the chord.
    Share(f64),
    /// At the real chord.
    Length(Length),
}

/// The section arguments that several verbs share.
#[derive(Debug, clap::Args)]
pub(super) struct SectionSource {
    /// Designation of the section, such as "NACA 4412"; or a file: a section file (.toml), a traced
    /// outline (.dxf), a table of coordinates
    #[arg(value_name = "SECTION", num_args = 1..=2, required = true)]
    section: Vec<String>,
    /// Trailing edge: "published" as the section has it, "closed", or its thickness, such as "0.8 %"
    /// of the chord or, with --chord, "1 mm" [default: published]
    #[arg(long, value_name = "FINISH", value_parser = edge, allow_hyphen_values = true)]
    trailing_edge: Option<Edge>,
    /// Where the change to that thickness begins, a share of the chord [default: 0.6]
    #[arg(long, value_name = "X", requires = "trailing_edge", value_parser = edge_from, allow_hyphen_values = true)]
    edge_from: Option<f64>,
}

fn edge(text: &str) -> Result<Edge, String> {
    let text = text.trim();
    if let Some(percent) = text.strip_suffix('%') {
        let percent: f64 = percent.trim().parse().map_err(|_| format!("'{text}' is no percentage"))?;
        return match percent {
            0.0..=10.0 => Ok(Edge::Share(percent / 100.0)),
            _ => Err(format!("{percent} % is out of bounds: 0 to 10 % of the chord")),
        };
    }
    match text {
        "published" => Ok(Edge::Published),
        "closed" => Ok(Edge::Closed),
        length => length.parse().map(Edge::Length).map_err(|_| {
            "write published, closed, a share of the chord (\"0.8 %\") or a length (\"1 mm\")".to_owned()
        }),
    }
}

fn edge_from(text: &str) -> Result<f64, String> {
    text.parse()
        .ok()
        .filter(|x| (0.1..=0.98).contains(x))
        .ok_or_else(|| "it is a share of the chord from 0.1 to 0.98".to_owned())
}

impl SectionSource {
    /// The section, at a `chord` if one is known.
    pub(super) fn section(&self, chord: Option<Length>) -> Result<Section, Failure> {
        let from = self.edge_from.unwrap_or(Work::EDGE_FROM);
        let finish = match (self.trailing_edge.unwrap_or(Edge::Published), chord) {
            (Edge::Share(thickness), _) => Finish::Thick { thickness, from },
            (Edge::Length(length), Some(chord)) => {
                Finish::Thick { thickness: length.mm() / chord.mm(), from }
            }
            (Edge::Length(_), None) => {
                return Err(Failure::Input(
                    "a trailing edge in mm needs the chord it is for: give --chord, or a share of the chord (\"0.8 %\")"
                        .to_owned(),
                ));
            }
            (Edge::Published | Edge::Closed, _) if self.edge_from.is_some() => {
                return Err(Failure::Input(
                    "--edge-from goes with a thickness of the trailing edge, such as --trailing-edge \"1 %\""
                        .to_owned(),
                ));
            }
            (Edge::Published, _) => Finish::Published,
            (Edge::Closed, _) => Finish::Closed,
        };
        // A designation typed without quotes comes as two words.
        let named = self.section.join(" ");
        let path = Path::new(&named);
        // The user names a file wherever it is; what that file names in turn lies beside it.
        let is_file = plankform::section::names_a_file(&named) || path.is_file();
        let name = path.file_name().and_then(|name| name.to_str()).filter(|_| is_file).unwrap_or(&named);
        let read = reader_beside(path);
        Beside::new(&read).named(name, finish).map_err(|error| match error {
            SectionFileError::Reading { source, .. } => Failure::reading(path.display(), &source),
            other => Failure::Input(other.render(in_colour())),
        })
    }
}
