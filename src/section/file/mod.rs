//! The section file, in TOML: a section as equations, as a member of a family, as points in another
//! file or as a blend of two others, with what is changed of it.

mod basis;
mod beside;
mod changes;
mod expressions;
mod reader;

pub use beside::{Beside, SectionFileError, names_a_file};

use std::ops::Range;

use super::Section;
use crate::problems::FileErrors;
use reader::Reader;

/// The largest section file that is read, in bytes. It bounds the work that a file can ask for.
pub const LARGEST_SECTION_FILE: usize = 20_000;

/// What every section file may hold.
const KEYS: &[&str] = &[
    "name",
    "camber",
    "thickness",
    "upper",
    "lower",
    "constants",
    "family",
    "coordinates",
    "blend",
    "work",
    "flap",
];

pub(super) fn parse(text: &str, file_name: &str, beside: &Beside<'_>) -> Result<Section, FileErrors> {
    let mut reader = Reader::new(text);
    match section(&mut reader, beside) {
        Some(section) if reader.problems.is_empty() => Ok(section),
        _ => Err(reader.problems.report(text, file_name)),
    }
}

fn section(reader: &mut Reader<'_>, beside: &Beside<'_>) -> Option<Section> {
    let root = reader.root()?;
    let root = root.get_ref();
    reader.refuse_unknown(root, KEYS, "a section file");
    let name = reader.name(root);
    let basis = basis::read(reader, root, name.clone().unwrap_or_default(), beside);
    let changes = changes::read(reader, root);
    let (basis, place) = basis?;
    let (changes, name) = (changes?, name?);
    let section = changes.made(reader, basis, &place)?;
    // What a change adds to the name is said by the maker's own.
    Some(section.named(name))
}

/// What a section comes from, with the place in the file that is to blame for its shape.
type Placed<T> = (T, Range<usize>);
