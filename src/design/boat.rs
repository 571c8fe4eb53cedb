//! The boat on its two foils, and what each of them carries.

use super::keys;
use super::model::{Design, Duty, Kind, Lift};
use super::reader::{Row, Sheet};
use crate::loading::{Drive, LoadingError, Shares, TwoFoils, Weight};
use crate::problems::{Problems, Wrong};
use crate::section::Beside;
use crate::units::{Length, clipped};

/// Standard gravity, m/s².
const GRAVITY: f64 = crate::flow::GRAVITY;
/// By what share masses that are given twice may differ.
const SAME_MASS: f64 = 0.01;

/// Which part of the boat a design is.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Role {
    /// The foil whose file describes the boat.
    Describing,
    /// The other foil.
    Other,
    /// What holds the describing foil below the hull.
    Strut,
}

/// A boat.
#[derive(Debug, Clone, PartialEq)]
pub struct Boat {
    /// Which part of it the design is.
    pub role: Role,
    /// Root quarter chord of the describing foil aft of the mark, mm; `None` where shares are given.
    pub foil_at: Option<f64>,
    /// That of the other foil.
    pub other_at: Option<f64>,
    /// How much deeper the other foil lies, mm.
    pub other_below: f64,
    /// What it weighs: kg and mm aft of the mark.
    pub weights: Vec<(f64, f64)>,
    /// All that flies, kg.
    pub mass: f64,
    /// The sail's drive, N.
    pub drive: f64,
    /// Height of the sail's centre of effort above the drag's, mm.
    pub effort_height: f64,
    /// Side force on the strut, N.
    pub side_force: f64,
    /// Heel, radians.
    pub heel: f64,
    /// What the describing foil and the other one carry without moments of their own, kg.
    pub carries: [f64; 2],
    /// The other part that this one is worked out with: the other foil, or the describing one.
    pub partner: Option<Box<Design>>,
}

impl Boat {
    /// What the describing foil and the other one carry when the foils' own nose-up moments together are
    /// so many N m; kg.
    ///
    /// # Errors
    /// When a foil would have to pull down.
    pub fn shares(&self, own_moment: f64) -> Result<[f64; 2], LoadingError> {
        let (Some(foil), Some(other)) = (self.foil_at, self.other_at) else { return Ok(self.carries) };
        let is_ahead = foil < other;
        let two = TwoFoils {
            forward: foil.min(other),
            after: foil.max(other),
            weights: self.weights.iter().map(|(kg, aft)| Weight { force: kg * GRAVITY, aft: *aft }).collect(),
            drive: Drive { force: self.drive, effort_height: self.effort_height, drag_height: 0.0 },
            own_moment,
        };
        let Shares { forward, after } = two.shares()?;
        let shares = if is_ahead { [forward, after] } else { [after, forward] };
        Ok(shares.map(|force| force / GRAVITY))
    }

    /// What the design's own foil and its partner carry of a pair of the describing foil's and the other's.
    #[must_use]
    pub fn own_first(&self, [describing, other]: [f64; 2]) -> [f64; 2] {
        if self.role == Role::Other { [other, describing] } else { [describing, other] }
    }

    /// How far aft of the design's own foil its partner lies, and how much deeper, mm; `None` where places
    /// are not given.
    #[must_use]
    pub fn to_partner(&self) -> Option<[f64; 2]> {
        let (aft, below) = (self.other_at? - self.foil_at?, self.other_below);
        Some(if self.role == Role::Other { [-aft, -below] } else { [aft, below] })
    }
}

/// Reads what stands about the boat. `follow`: whether it may read the designs that are named in turn.
pub(super) fn boat(
    sheet: &Sheet,
    kind: Option<Kind>,
    beside: &Beside<'_>,
    follow: bool,
    problems: &mut Problems,
) -> Option<Boat> {
    let Some(row) = sheet.one(&keys::BOAT) else {
        if let Some(weight) = sheet.all(&keys::WEIGHT).first() {
            let wrong = Wrong::new("[[weight]] is part of a boat, and there is no [boat]");
            problems.add(weight.opening(), wrong.help("write [boat] with foil-at and other-at"));
        }
        return None;
    };
    match row.text("described-in") {
        Some(_) if !follow => None,
        Some(file) => elsewhere(row, file, kind, beside, problems),
        None => here(sheet, row, kind, beside, follow, problems),
    }
}

/// The design of a file that is named.
fn named(row: &Row, key: &str, file: &str, beside: &Beside<'_>, problems: &mut Problems) -> Option<Design> {
    let read = beside.text_of(file, super::LARGEST_FILE).map_err(|error| error.to_string());
    let design = read.and_then(|(text, path, beside)| {
        super::read_alone(&text, &path, &beside).map_err(|errors| {
            let first = errors.problems().first();
            let first = first.map_or(String::new(), |p| format!("line {}: {}", p.line, p.message));
            format!("{path}, {first}")
        })
    });
    let help = format!("`plankform check {}` shows what is wrong with it", clipped(file));
    design.map_err(|why| problems.add(row.place(key), Wrong::new(why).help(help))).ok()
}

/// A boat that another design describes.
fn elsewhere(
    row: &Row,
    file: &str,
    kind: Option<Kind>,
    beside: &Beside<'_>,
    problems: &mut Problems,
) -> Option<Boat> {
    let mine = ["foil-at", "other-at", "mass", "other-carries", "other-foil"];
    for key in mine.into_iter().filter(|key| row.given(key)) {
        let wrong = Wrong::new(format!("the boat is described in {}, and {key} stands there", clipped(file)));
        problems.add(row.place(key), wrong.help("leave it out here"));
    }
    let describing = named(row, "described-in", file, beside, problems)?;
    let Some(boat) = describing.boat.clone() else {
        let wrong = Wrong::new(format!("{} describes no boat", clipped(file)));
        problems.add(row.place("described-in"), wrong.help("write [boat] there"));
        return None;
    };
    let role = if kind? == describing.kind || !kind?.mirrored() { Role::Strut } else { Role::Other };
    if kind? == describing.kind {
        let wrong = Wrong::new(format!("{} describes a {} too", clipped(file), describing.kind.word()));
        problems.add(row.place("described-in"), wrong.help("a boat has one of each kind"));
        return None;
    }
    Some(Boat { role, partner: Some(Box::new(describing)), ..boat })
}

/// The boat that this design describes.
fn here(
    sheet: &Sheet,
    row: &Row,
    kind: Option<Kind>,
    beside: &Beside<'_>,
    follow: bool,
    problems: &mut Problems,
) -> Option<Boat> {
    if kind.is_some_and(|kind| !kind.mirrored()) {
        let wrong = Wrong::new("a boat is described in the design of a foil that lies level");
        problems.add(row.opening(), wrong.help("write described-in = \"main-foil.toml\" here"));
        return None;
    }
    let partner = match row.text("other-foil") {
        Some(file) if follow => named(row, "other-foil", file, beside, problems).map(Box::new),
        _ => None,
    };
    let weights: Vec<(f64, f64)> = sheet
        .all(&keys::WEIGHT)
        .iter()
        .filter_map(|weight| Some((weight.number("mass")?, weight.length("aft")?.mm())))
        .collect();
    let duty = sheet.one(&keys::DUTY);
    let carries = duty.and_then(|duty| duty.number("carries"));
    let (places, other) = (
        (row.length("foil-at").map(Length::mm), row.length("other-at").map(Length::mm)),
        row.number("other-carries"),
    );
    let sum: f64 = weights.iter().map(|weight| weight.0).sum();
    let mass = row.number("mass").unwrap_or(if weights.is_empty() {
        carries.unwrap_or(0.0) + other.unwrap_or(0.0)
    } else {
        sum
    });
    let mut boat = Boat {
        role: Role::Describing,
        foil_at: places.0,
        other_at: places.1,
        other_below: row.length("other-below")?.mm(),
        weights,
        mass,
        drive: row.number("drive")?,
        effort_height: row.length("effort-height")?.mm(),
        side_force: row.number("side-force")?,
        heel: row.angle("heel")?.radians(),
        carries: [carries.unwrap_or(0.0), other.unwrap_or(0.0)],
        partner,
    };
    let mut apart = |what: &str, found: f64, said: f64, key: &str, row: &Row| {
        if (found - said).abs() > SAME_MASS * said.max(found) {
            let message = format!("{what}: {found:.1} kg against {said:.1} kg");
            problems.add(row.place(key), Wrong::new(message).help("mend one of them, or leave one out"));
        }
    };
    if boat.weights.is_empty() {
        let (Some(mine), Some(other)) = (carries, other) else {
            let wrong = Wrong::new("[boat] has neither weights nor shares to tell what the foil carries");
            let help = "add [[weight]] tables with foil-at and other-at, or carries in [duty] and other-carries here";
            problems.add(row.opening(), wrong.help(help));
            return None;
        };
        apart("the shares do not add up to the mass of the boat", mine + other, mass, "other-carries", row);
        return Some(boat);
    }
    apart("the weights do not add up to the mass of the boat", sum, mass, "mass", row);
    if places.0.is_none() || places.1.is_none() {
        let wrong = Wrong::new("weights balance on two foils, and [boat] does not say where both lie");
        problems.add(row.opening(), wrong.help("write foil-at and other-at"));
        return None;
    }
    match boat.shares(0.0) {
        Ok(shares) => {
            boat.carries = shares;
            if let (Some(carries), Some(duty)) = (carries, duty) {
                apart("the share given is not that of the balance", shares[0], carries, "carries", duty);
            }
            if let Some(other) = other {
                apart(
                    "the other foil's share is not that of the balance",
                    shares[1],
                    other,
                    "other-carries",
                    row,
                );
            }
            Some(boat)
        }
        Err(error) => {
            problems.add(row.opening(), Wrong::new(format!("the boat does not balance: {error}")));
            None
        }
    }
}

/// What the foil does on its boat, from its own [duty] and that of the design that describes the boat.
pub(super) fn duty(
    row: Option<&Row>,
    kind: Option<Kind>,
    boat: Option<&Boat>,
    (lift, half_span): (Option<&Lift>, Option<Length>),
    problems: &mut Problems,
) -> Option<Option<Duty>> {
    let Some(row) = row else {
        // The other foil flies at the speeds of the one that describes the boat.
        let described = boat.filter(|boat| boat.role == Role::Other);
        let duty = described.and_then(|boat| Some((boat, boat.partner.as_ref()?.duty?)));
        return Some(duty.map(|(boat, duty)| Duty {
            carries: boat.carries[1],
            depths: duty.depths.map(|depth| depth + boat.other_below),
            set_at: None,
            ..duty
        }));
    };
    if kind.is_some_and(|kind| !kind.mirrored()) {
        let wrong = Wrong::new("a duty is for a foil that lies level: a main foil or an elevator")
            .help("leave [duty] out");
        problems.add(row.opening(), wrong);
    }
    let top = lift?.top_speed;
    let (take_off, cruise) = (row.number("take-off")?, row.number("cruise"));
    for (key, faster) in [("cruise", cruise), ("take-off", top)] {
        if faster.is_some_and(|faster| faster <= take_off) {
            let what = if key == "cruise" { "cruise" } else { "top-speed of [lift]" };
            let wrong =
                Wrong::new(format!("{what} does not lie above take-off: the speeds are out of order"))
                    .help("take-off is the slowest of them");
            problems.add(row.place(key), wrong);
        }
    }
    if let (Some(cruise), Some(top)) = (cruise, top)
        && top < cruise
    {
        let wrong = Wrong::new("cruise lies above top-speed of [lift]: the speeds are out of order");
        problems.add(row.place("cruise"), wrong.help("take-off, cruise, top speed, in rising order"));
    }
    let keys = ["take-off-depth", "cruise-depth", "top-depth"];
    let depth = |key: &str| row.length(key).map_or(lift.map_or(0.0, |lift| lift.depth.mm()), Length::mm);
    let depths = keys.map(depth);
    let heel = boat.map_or(0.0, |boat| boat.heel);
    let up = half_span.map_or(0.0, |half| half.mm() * heel.sin());
    for (key, depth) in keys.into_iter().zip(depths) {
        if depth <= up {
            let message = format!(
                "the foil comes out of the water: its root is {depth:.0} mm deep, and heel lifts a tip by {up:.0} mm"
            );
            problems.add(row.place(key), Wrong::new(message).help("take more depth, or less heel"));
        }
    }
    let carries = match (row.number("carries"), boat) {
        (_, Some(boat)) => boat.carries[usize::from(boat.role == Role::Other)],
        (Some(carries), None) => carries,
        (None, None) => {
            let wrong = Wrong::new("[duty] does not say what the foil carries").help(
                "write carries = \"150 kg\", or what yours is, or a [boat] with weights that balance on its foils",
            );
            problems.add(row.opening(), wrong);
            return None;
        }
    };
    Some(Some(Duty {
        carries,
        take_off,
        cruise,
        share: row.number("share")?,
        depths,
        set_at: row.angle("set-at"),
        stall_margin: row.angle("stall-margin")?,
    }))
}
