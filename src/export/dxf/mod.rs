//! Drawings for routers: DXF in millimetres, in two flavours.
//!
//! Written by hand and not by a library, because the group codes in use are few, every handle is
//! the same from run to run, and other people's audits find nothing to repair. Group codes are
//! those of the published DXF reference.

mod r12;
mod r2000;

use std::borrow::Cow;

use crate::workshop::{Drawing, Role};

/// Which release of the format.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Flavour {
    /// Release AC1015 (2000): light-weight polylines, units in the header.
    R2000,
    /// Release AC1009 (R12): for the oldest readers. Polylines with a record for each vertex; no place
    /// for units, so the file says them in words.
    R12,
}

/// How curved contours are written.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Curves {
    /// Polylines whose segments are lines and arcs.
    Arcs,
    /// Contours with arcs as cubic splines; release 2000 alone has them.
    Splines,
}

/// The drawing as a DXF file. A layer for each role; closed contours are closed polylines with arcs as
/// bulges, or closed splines; labels are text.
#[must_use]
pub fn dxf(drawing: &Drawing, flavour: Flavour, curves: Curves) -> String {
    match flavour {
        Flavour::R2000 => r2000::dxf(drawing, curves),
        Flavour::R12 => r12::dxf(drawing),
    }
}

/// Layers of every file, whether something is on them or not; pockets come after them.
const LAYERS: [Role; 8] = [
    Role::CutOutside,
    Role::CutInside,
    Role::Drill,
    Role::Engrave,
    Role::Tab,
    Role::Reference,
    Role::Label,
    Role::Check,
];

/// Colour number of a role's layer.
fn colour(role: Role) -> u8 {
    match role {
        Role::CutOutside => 1,
        Role::CutInside => 2,
        Role::Pocket(_) => 4,
        Role::Drill => 6,
        Role::Engrave => 30,
        Role::Tab => 7,
        Role::Reference => 5,
        Role::Label | Role::Caption => 3,
        Role::Check => 8,
    }
}

/// Name and colour of each layer of a drawing, that of the format itself first.
fn layers(drawing: &Drawing) -> Vec<(Cow<'static, str>, u8)> {
    let mut pockets: Vec<Role> =
        drawing.lines.iter().map(|line| line.role).filter(|role| matches!(role, Role::Pocket(_))).collect();
    pockets.sort_unstable();
    pockets.dedup();
    let own = LAYERS.into_iter().chain(pockets).map(|role| (role.layer(), colour(role)));
    std::iter::once((Cow::Borrowed("0"), 7)).chain(own).collect()
}

/// Decimals of a coordinate: a tenth of a micrometre.
const PLACES: usize = 7;

/// Pairs of group code and value, a line each.
#[derive(Default)]
struct Pairs {
    text: String,
}

impl Pairs {
    fn pair(&mut self, code: u16, value: impl std::fmt::Display) {
        use std::fmt::Write as _;
        // Writing to a string cannot fail.
        let _ = write!(self.text, "{code}\n{value}\n");
    }

    fn pairs(&mut self, pairs: &[(u16, &str)]) {
        for (code, value) in pairs {
            self.pair(*code, value);
        }
    }

    fn real(&mut self, code: u16, value: f64) {
        // A real needs its decimal point to be read as one by strict readers.
        let short = crate::units::number(value, PLACES);
        let text = if short.contains('.') { short } else { format!("{short}.0") };
        self.pair(code, text);
    }

    /// What the drawing reaches over, for the header.
    fn extents(&mut self, drawing: &Drawing) {
        let bounds = drawing.bounds();
        for (name, x, y) in [("$EXTMIN", bounds.x0, bounds.y0), ("$EXTMAX", bounds.x1, bounds.y1)] {
            self.pair(9, name);
            self.real(10, x);
            self.real(20, y);
            self.real(30, 0.0);
        }
    }

    fn bulge(&mut self, bulge: f64) {
        if bulge != 0.0 {
            // Bulges multiply lengths, so they need decimals of their own.
            self.pair(42, format_args!("{bulge:.12}"));
        }
    }
}

/// Text in plain ASCII, as every reader takes it. Other characters by their number, which the oldest
/// readers do not know, or plainly where they have a plain form.
fn escaped(text: &str, flavour: Flavour) -> String {
    text.chars()
        .map(|c| match c {
            '°' => "%%d".to_owned(),
            '²' => "2".to_owned(),
            '·' if flavour == Flavour::R12 => "-".to_owned(),
            ' '..='~' => c.to_string(),
            c if c.is_control() => " ".to_owned(),
            _ if flavour == Flavour::R12 => "?".to_owned(),
            c => format!("\\U+{:04X}", u32::from(c)),
        })
        .collect()
}
