//! Writers that know a file format and nothing of foils. Each gives the bytes of one file, the
//! same for the same input.

mod axis;
pub mod chart;
pub mod csv;
mod dxf;
pub mod html;
mod pdf;
mod solid_view;
mod stl;
mod svg;

pub use dxf::{Curves, Flavour, dxf};
pub use pdf::pdf;
pub use solid_view::solid_view;
pub use stl::stl;
pub use svg::{numbered_picture, page_picture, picture, svg_page};

/// Why a file cannot be made from what it was given.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("the {format} file cannot be written: {why}")]
pub struct ExportError {
    /// Name of the format.
    pub format: &'static str,
    /// What its library said.
    pub why: String,
}
