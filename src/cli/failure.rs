//! Why a verb ended early, and the exit status that says so.

use std::fmt;
use std::io;

use plankform::pack::PackError;

/// Why a verb ended early.
#[derive(Debug)]
pub(super) enum Failure {
    /// The input is wrong; nothing was written.
    Input(String),
    /// Reading or writing failed; nothing is half-written.
    Disk(String),
}

impl Failure {
    pub(super) fn input(error: impl fmt::Display) -> Self {
        Self::Input(error.to_string())
    }

    // The kind alone: libraries add the names of their temporary files, which tell a user nothing.
    pub(super) fn writing(what: impl fmt::Display, error: &io::Error) -> Self {
        Self::Disk(format!("cannot write {what}: {}", error.kind()))
    }

    pub(super) fn reading(what: impl fmt::Display, error: &io::Error) -> Self {
        Self::Disk(format!("cannot read {what}: {}", error.kind()))
    }

    pub(super) fn exit_status(&self) -> u8 {
        match self {
            Self::Input(_) => 2,
            Self::Disk(_) => 3,
        }
    }
}

impl fmt::Display for Failure {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            // Reports with places in a file carry their own heading.
            Self::Input(text) if text.starts_with("error") => f.write_str(text),
            Self::Input(text) | Self::Disk(text) => write!(f, "error: {text}"),
        }
    }
}

impl From<PackError> for Failure {
    fn from(error: PackError) -> Self {
        match error {
            PackError::Disk { .. } => Self::Disk(error.to_string()),
            _ => Self::Input(error.to_string()),
        }
    }
}
