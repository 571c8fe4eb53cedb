//! The design file: what it may hold, what is wrong with it and where, and the design it makes.
//!
//! A file is read in three steps. `reader` and `value` hold each value against the registry in
//! `keys`; `resolve` holds the values against each other and builds the sections; what any of them
//! finds wrong is gathered in one [`DesignErrors`], so that a maker mends a file in one go.

mod boat;
mod fingerprint;
mod keys;
mod model;
mod page;
mod parts;
mod reader;
mod resolve;
mod resolve_ends;
mod resolve_wood;
mod schema;
mod starter;
mod strength;
mod value;
mod wing;

pub use crate::problems::{FileErrors as DesignErrors, Problem};
pub use boat::{Boat, Role};
pub use model::{
    Cut, CutKind, Design, Duty, DxfRelease, Faces, Flap, FlapKind, Hands, HingeFrom, Kind, Laminate, Lift,
    MaskShapes, Masks, Paper, PaperSize, Ply, PlySide, Printer, Router, Station, Stock, Tip, TipShape,
};
pub use page::key_tables;
pub use schema::schema;
pub use starter::{SCHEMA_FILE, starter};
pub use strength::{Case, CaseLoad, Form, Joint, Material, Strength};

use crate::problems::{Problems, Wrong};
use crate::section::Beside;

/// The largest design file that is read, in bytes.
pub const LARGEST_FILE: usize = 1_000_000;

impl Design {
    /// Reads a design from the text of its file; `file_name` is only repeated in messages.
    ///
    /// # Errors
    /// Everything that is wrong with the file, each with its place and what would be right: no
    /// TOML, unknown or missing keys, values of the wrong kind or out of bounds, stations out of
    /// order, sections that do not exist or stand in a file, files larger than [`LARGEST_FILE`].
    pub fn parse(text: &str, file_name: &str) -> Result<Self, DesignErrors> {
        let nothing = |_: &str, _: usize| Err(std::io::Error::from(std::io::ErrorKind::NotFound));
        Self::parse_beside(text, file_name, &Beside::new(&nothing))
    }

    /// The same for a design whose stations may name the files `beside` it as their sections.
    ///
    /// # Errors
    /// As [`Design::parse`], and what is wrong with those files.
    pub fn parse_beside(text: &str, file_name: &str, beside: &Beside<'_>) -> Result<Self, DesignErrors> {
        read_all(text, file_name, beside, true)
    }
}

/// A design that another one names: the designs that it names in turn are not read.
fn read_alone(text: &str, file_name: &str, beside: &Beside<'_>) -> Result<Design, DesignErrors> {
    read_all(text, file_name, beside, false)
}

fn read_all(text: &str, file_name: &str, beside: &Beside<'_>, follow: bool) -> Result<Design, DesignErrors> {
    let mut problems = Problems::default();
    match read(text, beside, follow, &mut problems) {
        Some(design) if problems.is_empty() => Ok(design),
        _ => Err(problems.report(text, file_name)),
    }
}

fn read(text: &str, beside: &Beside<'_>, follow: bool, problems: &mut Problems) -> Option<Design> {
    if text.len() > LARGEST_FILE {
        let message = format!("the file has too many bytes: a design has {LARGEST_FILE} at most");
        problems.add(0..0, Wrong::new(message));
        return None;
    }
    let root = problems.toml(text, "a design file")?;
    if root.get_ref().is_empty() {
        let wrong = Wrong::new("the file holds no design: there is not one key in it")
            .help("`plankform new FILE` writes a design to start from");
        problems.add(0..0, wrong);
        return None;
    }
    let sheet = reader::Sheet::read(root.get_ref(), problems);
    resolve::design(&sheet, beside, follow, problems)
}
