//! The pack: every workshop file of a design, checked, fingerprinted and written as one.

mod aids;
mod bucket;
mod checks;
mod checks_wood;
mod contents;
mod cut_pieces;
mod duty;
mod error;
mod friction;
mod manifest;
mod printed;
mod sheet;
mod station;
mod strength;
mod surface;
mod tables;
mod wood;
mod workshop_checks;
mod write;

pub use bucket::bucket_chart;
pub use checks::{Check, run_checks, run_checks_telling};
pub use contents::{Kinds, build, build_telling};
pub use error::PackError;
pub use manifest::{Entry, Manifest};
pub use write::write;

/// A file of the pack, made but not yet written.
#[derive(Debug, Clone, PartialEq)]
pub struct PackFile {
    /// Place inside the pack, with `/` between folders.
    pub path: String,
    /// Format: `dxf`, `svg`, `pdf`, `stl`, `csv` or `html`.
    pub kind: &'static str,
    /// What it is for.
    pub role: &'static str,
    /// Distance from the root of the station it belongs to, mm.
    pub station_mm: Option<f64>,
    /// Its contents.
    pub bytes: Vec<u8>,
}

/// A pack, made but not yet written.
#[derive(Debug, Clone, PartialEq)]
pub struct Pack {
    /// What it holds and whether its checks passed.
    pub manifest: Manifest,
    /// The checks, all of them.
    pub checks: Vec<Check>,
    /// Its files, but for the manifest's own.
    pub files: Vec<PackFile>,
}
