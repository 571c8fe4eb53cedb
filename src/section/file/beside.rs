//! Files that lie beside the one that names them.

use std::fmt;
use std::io;

use crate::problems::{FileErrors, text_of};
use crate::section::coordinates::{self, LARGEST_DRAWING, LARGEST_TABLE};
use crate::section::{Finish, LARGEST_SECTION_FILE, Section, SectionError};

/// Reads the files that a design or a section file names.
///
/// The library opens none itself. `read` is given a name as relative path with `/` between its
/// parts, none of them `..`, and the most bytes that are of use.
#[derive(Clone)]
pub struct Beside<'a> {
    read: &'a dyn Fn(&str, usize) -> io::Result<Vec<u8>>,
    /// Folder of the file that names others, as a prefix: empty, or ending in `/`.
    folder: String,
    /// How many files have named one another on the way here.
    depth: usize,
}

/// How many files may name one another in a row.
const DEEPEST: usize = 8;
const LONGEST_NAME: usize = 200;

/// Why a section file gives no section.
#[derive(Debug)]
pub enum SectionFileError {
    /// The name is none that is followed.
    Name {
        /// The name, made harmless.
        file: String,
        /// Why not.
        why: &'static str,
    },
    /// It cannot be read.
    Reading {
        /// Its name.
        file: String,
        /// What the system says.
        source: io::Error,
    },
    /// It is no text.
    NotText {
        /// Its name.
        file: String,
        /// Byte at which it stops being text.
        at: usize,
    },
    /// It is a designation that is wrong, or its trailing edge cannot be finished as asked.
    Section(SectionError),
    /// Its text is wrong.
    Text(FileErrors),
    /// Its drawing holds no section.
    Drawing {
        /// Its name.
        file: String,
        /// What is wrong.
        why: coordinates::CoordinateError,
    },
}

impl<'a> Beside<'a> {
    /// Files that `read` gives.
    pub fn new(read: &'a dyn Fn(&str, usize) -> io::Result<Vec<u8>>) -> Self {
        Self { read, folder: String::new(), depth: 0 }
    }

    /// The section that a file holds: a section file (`.toml`), a traced outline (`.dxf`), or a
    /// table of coordinates (anything else).
    ///
    /// # Errors
    /// When the name is not one that is followed, the file cannot be read, or what is wrong with it.
    pub fn section(&self, name: &str) -> Result<Section, SectionFileError> {
        let (path, inner) = self.at(name)?;
        if ends_in(name, "toml") {
            let text = self.text(&path, LARGEST_SECTION_FILE)?;
            return super::parse(&text, &path, &inner).map_err(SectionFileError::Text);
        }
        self.coordinates(name, None)
    }

    /// The section of a designation, or of a file named as for [`Beside::section`], finished as asked.
    ///
    /// # Errors
    /// As there, when the text is no designation, and when the edge cannot be finished so.
    pub fn named(&self, text: &str, finish: Finish) -> Result<Section, SectionFileError> {
        let section = if names_a_file(text) {
            self.section(text)?
        } else {
            Section::from_designation(text, finish.of_family()).map_err(SectionFileError::Section)?
        };
        finish.of(section).map_err(SectionFileError::Section)
    }

    /// The section through the points of a table or a traced outline, within `tolerance` of them.
    pub(super) fn coordinates(
        &self,
        name: &str,
        tolerance: Option<f64>,
    ) -> Result<Section, SectionFileError> {
        let (path, _) = self.at(name)?;
        let traced = if ends_in(name, "dxf") {
            let bytes = self.bytes(&path, LARGEST_DRAWING)?;
            coordinates::from_dxf(&bytes, &path, tolerance)
                .map_err(|why| SectionFileError::Drawing { file: path.clone(), why })?
        } else {
            let text = self.text(&path, LARGEST_TABLE)?;
            coordinates::from_table(&text, &path, tolerance).map_err(SectionFileError::Text)?
        };
        let title = traced.report.title.clone().filter(|title| !title.trim().is_empty());
        let stem = path.rsplit('/').next().unwrap_or(&path);
        let stem = stem.rsplit_once('.').map_or(stem, |(stem, _)| stem);
        // Names stand in files that know nothing but plain letters.
        let plain = |c: char| if c.is_ascii_graphic() || c == ' ' { c } else { '-' };
        let name: String = title.unwrap_or_else(|| stem.to_owned()).chars().take(60).map(plain).collect();
        Ok(Section::fitted(name, traced))
    }

    /// The text of a file that is named, its path, and what lies beside it in turn.
    pub(crate) fn text_of(
        &self,
        name: &str,
        most: usize,
    ) -> Result<(String, String, Self), SectionFileError> {
        let (path, inner) = self.at(name)?;
        Ok((self.text(&path, most)?, path, inner))
    }

    /// The path of a named file, and what lies beside that file in turn.
    fn at(&self, name: &str) -> Result<(String, Self), SectionFileError> {
        let wrong = |why| Err(SectionFileError::Name { file: crate::units::clipped(name), why });
        let strange = |part: &str| part.is_empty() || part == "." || part == "..";
        if name.len() > LONGEST_NAME || name.chars().any(|c| crate::units::harmless(c) != c) {
            return wrong("the name is too long, or has characters in it that no file should have");
        }
        if name.split('/').any(strange) || name.contains(['\\', ':']) {
            return wrong(
                "write the name of a file beside the one that names it, or in a folder below, with / between",
            );
        }
        if self.depth >= DEEPEST {
            return wrong("too many files name one another in a row, or one names itself");
        }
        let path = format!("{}{name}", self.folder);
        let folder = path.rfind('/').map_or(String::new(), |end| path[..=end].to_owned());
        Ok((path, Self { read: self.read, folder, depth: self.depth + 1 }))
    }

    fn bytes(&self, path: &str, most: usize) -> Result<Vec<u8>, SectionFileError> {
        (self.read)(path, most + 1)
            .map_err(|source| SectionFileError::Reading { file: path.to_owned(), source })
    }

    fn text(&self, path: &str, most: usize) -> Result<String, SectionFileError> {
        let bytes = self.bytes(path, most)?;
        text_of(bytes, most).map_err(|at| SectionFileError::NotText { file: path.to_owned(), at })
    }
}

impl SectionFileError {
    /// Everything that is wrong, for reading on a terminal.
    #[must_use]
    pub fn render(&self, colour: bool) -> String {
        match self {
            Self::Text(errors) => errors.render(colour),
            other => other.to_string(),
        }
    }
}

impl fmt::Display for SectionFileError {
    /// In one line: of a text the first thing that is wrong.
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Name { file, why } => write!(formatter, "'{file}' is not followed: {why}"),
            Self::Reading { file, source } => write!(formatter, "{file} cannot be read: {source}"),
            Self::NotText { file, at } => write!(formatter, "{file}: byte {at} is not UTF-8 text"),
            Self::Section(error) => write!(formatter, "{error}"),
            Self::Drawing { file, why } => write!(formatter, "{file}: {why}"),
            Self::Text(errors) => {
                write!(formatter, "{}", errors.file_name())?;
                if let Some(first) = errors.problems().first() {
                    write!(formatter, ", line {}, column {}: {}", first.line, first.column, first.message)?;
                }
                match errors.problems().len() + errors.more() {
                    0 | 1 => Ok(()),
                    all => write!(formatter, " (and {} more)", all - 1),
                }
            }
        }
    }
}

impl std::error::Error for SectionFileError {}

/// Whether a text names a file and no published section: it has an ending of one to five letters,
/// which no designation has.
#[must_use]
pub fn names_a_file(text: &str) -> bool {
    text.rsplit_once('.').is_some_and(|(stem, ending)| {
        !stem.is_empty() && (1..=5).contains(&ending.len()) && ending.bytes().all(|b| b.is_ascii_alphabetic())
    })
}

fn ends_in(name: &str, ending: &str) -> bool {
    name.rsplit_once('.').is_some_and(|(_, found)| found.eq_ignore_ascii_case(ending))
}
