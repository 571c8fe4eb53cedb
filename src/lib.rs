//! From one design file to a checked pack of workshop files for home-built hydrofoils.
//!
//! Data goes one way through the modules, and a module uses only those before it:
//!
//! `units` → `problems` → `geometry` → `section` → `flow` → `wing` → `strength` → `workshop` → `export`
//!
//! [`design`] reads the user's file and builds a [`wing::Wing`] from it; [`pack`] walks the line
//! from there to the files on disk. Inside, geometry is in millimetres, sections are in unit
//! chord, flow is dimensionless and angles are in radians; units exist only at the edges.
//!
//! ```
//! use plankform::design::{Design, Kind, starter};
//! use plankform::pack::{Kinds, build};
//!
//! let design = Design::parse(&starter(Kind::Strut), "strut.toml")?;
//! let pack = build(&design, Kinds::ALL)?;
//! assert!(pack.manifest.passed);
//! assert!(pack.files.iter().any(|file| file.path == "sheet.html"));
//! # Ok::<(), Box<dyn std::error::Error>>(())
//! ```

pub mod design;
pub mod export;
pub mod flow;
pub mod geometry;
pub mod loading;
pub mod pack;
pub mod parts;
pub mod problems;
pub mod section;
pub mod strength;
pub mod units;
pub mod wing;
pub mod workshop;
