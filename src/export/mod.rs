//! Writers that know a file format and nothing of foils. Each gives the bytes of one file, the
//! same for the same input.

pub mod chart;
pub mod csv;
mod dxf;
pub mod html;
mod pdf;
mod stl;
mod svg;

pub use dxf::dxf;
pub use pdf::pdf;
pub use stl::stl;
pub use svg::{picture, svg_page};

/// Why a file cannot be made from what it was given.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("the {format} file cannot be written: {why}")]
pub struct ExportError {
    /// Name of the format.
    pub format: &'static str,
    /// What its library said.
    pub why: String,
}

/// A number with so many decimals, and never "-0.0".
#[must_use]
pub fn fixed(value: f64, places: usize) -> String {
    let text = format!("{value:.places$}");
    match text.strip_prefix('-') {
        Some(digits) if digits.bytes().all(|b| matches!(b, b'0' | b'.')) => digits.to_owned(),
        _ => text,
    }
}

/// A number as short as it can be with `places` decimals, and never "-0".
#[must_use]
pub fn number(value: f64, places: usize) -> String {
    let text = fixed(value, places);
    if text.contains('.') { text.trim_end_matches('0').trim_end_matches('.').to_owned() } else { text }
}
