//! What the water does to the whole foil: lift along the span, drag, the load it can carry, and how two
//! foils share a boat.
//!
//! A [`LiftingLine`] is laid once over a [`crate::wing::Wing`]; sections enter through [`SectionLift`],
//! so that theory and computed curves are fed in alike. The method, its sources and its limits:
//! `docs/lifting-line.md`.
//!
//! Axes as in [`crate::wing`]: x aft of the root's quarter chord, y along the span, z up, in
//! millimetres; angles in radians, nose up. Speeds in m/s, forces in N, moments in N m.
//!
//! ```
//! use plankform::loading::{LiftingLine, Setting, State, ThinSection};
//! use plankform::section::{Section, TrailingEdge};
//! use plankform::wing::{Station, Wing};
//!
//! let section = Section::from_designation("NACA 4412", TrailingEdge::Published)?;
//! let station = |at, chord| Station {
//!     at, chord, section: section.clone(), twist: 0.0, sweep: 0.0, rise: 0.0, twist_about: 0.25,
//! };
//! let wing = Wing::new(vec![station(0.0, 140.0), station(450.0, 80.0)], true)?;
//! let line = LiftingLine::new(&wing, &Setting { depth: Some(400.0), ..Setting::default() })?;
//! let thin = ThinSection { zero_lift: -0.07, ..ThinSection::default() };
//! let state = State { speed: 5.0, density: 1025.0, incidence: 0.0, flap: 0.0 };
//! let carried = line.incidence_for(&thin, &state, 900.0, (-0.1, 0.2))?;
//! assert!((carried.lift - 900.0).abs() < 0.1);
//! # Ok::<(), Box<dyn std::error::Error>>(())
//! ```

mod balance;
mod carry;
mod dense;
mod error;
mod induced;
mod lifting_line;
mod result;
mod section_lift;
mod strips;

pub use balance::{Drive, Shares, TwoFoils, Weight};
pub use carry::{SpeedPoint, TakeOff};
pub use error::LoadingError;
pub use lifting_line::{LiftingLine, MOST_STRIPS, State};
pub use result::{Loading, StripLoad};
pub use section_lift::{
    CurvePoint, FlapCurve, GreatestLift, SectionLift, SectionPoint, SectionTable, SpanTables, ThinSection,
};
pub use strips::{RootEnd, Setting};
