//! A short mark of everything that shapes the parts.

use std::fmt::Write;

use sha2::{Digest, Sha256};

use super::model::{Cut, Design, Flap, Hands, Ply, Station};
use crate::section::{Finish, names_a_file};
use crate::units::{Angle, Length, fixed};

impl Design {
    /// Eight hexadecimal digits such as `3f9a-01c7`, the first of a SHA-256 over everything that
    /// shapes the parts and their aids: the kind, the planform, the stations, templates, laminate,
    /// flap, masks and router.
    ///
    /// Names, notes, comments, the order of keys, the unit a value was written in, the paper,
    /// the printer, the stock and the range of the lift curves do not change it: pieces stay the
    /// same without them.
    #[must_use]
    pub fn fingerprint(&self) -> String {
        let digest = Sha256::digest(self.shape().as_bytes());
        let mut digits = String::with_capacity(9);
        for (i, byte) in digest.iter().take(4).enumerate() {
            let dash = if i == 2 { "-" } else { "" };
            // Writing to a string cannot fail.
            let _ = write!(digits, "{dash}{byte:02x}");
        }
        digits
    }

    /// The shape as text, one part a line. Changing it changes every fingerprint ever given.
    fn shape(&self) -> String {
        let mut lines = vec![
            "plankform shape 1".to_owned(),
            format!("kind {}", self.kind.word()),
            format!(
                "span {} {} twist about {}",
                mm(self.span),
                self.law.word(),
                fixed(self.twist_about, PLACES)
            ),
        ];
        // What is as it usually is says nothing, so that a design keeps its mark when such a key is new.
        if self.kind.mirrored() == (self.hands == Hands::OneHanded) {
            lines.push(format!("hands {:?}", self.hands));
        }
        lines.extend(self.tip.map(|tip| {
            let lengths = [tip.length, tip.chord].map(mm);
            format!("tip {:?} {} {}", tip.form, lengths.join(" "), fixed(tip.about, PLACES))
        }));
        if self.waterline.mm() > 0.0 {
            lines.push(format!("case {} water {}", mm(self.in_case), mm(self.waterline)));
        }
        lines.extend(self.stations.iter().map(|station| {
            format!(
                "station {} chord {} section {} {} twist {} sweep {} rise {}",
                mm(station.at),
                mm(station.chord),
                section(station),
                finish(station.finish),
                degrees(station.twist),
                mm(station.sweep),
                mm(station.rise)
            )
        }));
        lines.extend(self.templates.iter().map(|at| format!("template {}", mm(*at))));
        lines.extend(self.plies.iter().map(ply));
        if self.has_skin() {
            let laminate = &self.laminate;
            lines.push(format!("laminate finish {} rise {}", mm(laminate.finish), mm(laminate.rise)));
        }
        lines.extend(self.flap.as_ref().map(flap));
        lines.extend(self.cuts.iter().map(cut));
        let all = |what: &str, lengths: &[Length]| {
            let each: Vec<String> = lengths.iter().map(|&length| mm(length)).collect();
            format!("{what} {}", each.join(" "))
        };
        let masks = &self.masks;
        lines.push(all("masks", &[masks.clearance, masks.wall, masks.thickness]));
        lines.push(all("router", &[self.router.tolerance]));
        lines.join("\n")
    }
}

/// Decimals of every value: a nanometre is far below any tool and far above the rounding of
/// another unit.
const PLACES: usize = 6;

/// A published section by its name; one from a file by its shape, so that it does not matter how or
/// where that is written.
fn section(station: &Station) -> String {
    if !names_a_file(&station.designation) {
        return station.section.name().to_owned();
    }
    let mut digest = Sha256::new();
    for point in station.section.points(SHAPE_POINTS) {
        digest.update(format!("{} {};", fixed(point.x, SHAPE_PLACES), fixed(point.y, SHAPE_PLACES)));
    }
    digest.finalize().iter().take(16).map(|byte| format!("{byte:02x}")).collect()
}

/// Points and decimals by which a shape is known: a change of a hundred-millionth of the chord tells.
const SHAPE_POINTS: usize = 401;
const SHAPE_PLACES: usize = 8;

/// What of a ply decides how much it takes up and where.
fn ply(ply: &Ply) -> String {
    let thickness = ply.thickness.map_or_else(|| "computed".to_owned(), mm);
    let numbers = [ply.weight, ply.fibre_density, ply.fibre_share, ply.chord_from, ply.chord_to]
        .map(|v| fixed(v, PLACES));
    format!("ply {:?} {thickness} {} span {} {}", ply.on, numbers.join(" "), mm(ply.from), mm(ply.to))
}

fn flap(flap: &Flap) -> String {
    let numbers = [flap.hinge, flap.hinge_end, flap.axis].map(|v| fixed(v, PLACES));
    let travel = [flap.up, flap.down].map(degrees);
    let lengths = [flap.from, flap.to, flap.clearance, flap.face].map(mm);
    let mut line =
        format!("flap {} {} {} {}", flap.kind.word(), numbers.join(" "), travel.join(" "), lengths.join(" "));
    if let Some((from, lengths)) = flap.hinge_lengths {
        let _ = write!(line, " hinge from {from:?} {}", lengths.map(mm).join(" "));
    }
    line
}

fn cut(cut: &Cut) -> String {
    let lengths = [cut.width, cut.depth, cut.from, cut.to].map(mm);
    let numbers = [cut.at, cut.height].map(|v| fixed(v, PLACES));
    let mut line =
        format!("cut {:?} {} {} {}", cut.kind, cut.from_upper, numbers.join(" "), lengths.join(" "));
    if let Some(chord) = cut.chord {
        let _ = write!(line, " chord {}", chord.map(|v| fixed(v, PLACES)).join(" "));
    }
    line
}

fn finish(finish: Finish) -> String {
    match finish {
        Finish::Published | Finish::Closed => finish.of_family().word().to_owned(),
        Finish::Thick { thickness, from } => {
            format!("edge {} from {}", fixed(thickness, SHAPE_PLACES), fixed(from, PLACES))
        }
    }
}

fn mm(length: Length) -> String {
    fixed(length.mm(), PLACES)
}

fn degrees(angle: Angle) -> String {
    fixed(angle.degrees(), PLACES)
}
