//! From the values of a file to the wood: laminate, flap and cut-outs.

use super::model::{Cut, CutKind, Design, Flap, FlapKind, HingeFrom, Laminate, Ply, PlySide, Wood};
use super::reader::{Row, Sheet};
use super::resolve::{Reach, SAME};
use super::strength;
use crate::problems::{Problems, Wrong};
use crate::units::Length;

pub(super) fn wood(row: &Row) -> Option<Wood> {
    Some(Wood {
        species: row.text("species")?.to_owned(),
        density: row.number("density")?,
        allowance: row.length("allowance")?,
    })
}

pub(super) fn laminate(row: &Row) -> Option<Laminate> {
    Some(Laminate {
        finish: row.length("finish")?,
        rise: row.length("rise")?,
        least_wood: row.length("least-wood")?,
    })
}

pub(super) fn ply(sheet: &Sheet, row: &Row, reach: Option<&Reach>, problems: &mut Problems) -> Option<Ply> {
    let (from, to) = stretch(row, "the ply", reach, problems)?;
    let (chord_from, chord_to) = (row.number("chord-from")?, row.number("chord-to")?);
    if chord_to <= chord_from {
        let message =
            format!("the ply runs from {chord_from} to {chord_to} of the chord, and leaves nothing between");
        problems.add(
            row.place("chord-from"),
            Wrong::new(message).help("chord-from lies nearer to the nose than chord-to"),
        );
    }
    Some(Ply {
        cloth: row.text("cloth")?.to_owned(),
        weight: row.number("weight")?,
        fibre_density: row.number("fibre-density")?,
        resin_density: row.number("resin-density")?,
        fibre_share: row.number("fibre-share")?,
        thickness: row.length("thickness"),
        on: row.text("on").and_then(PlySide::from_word)?,
        from,
        to,
        chord_from,
        chord_to,
        material: strength::named(sheet, row, "material", problems),
        angle: row.angle("angle")?,
    })
}

/// A flap as the file gives it; where its hinge is given as lengths, the fractions are filled in by
/// [`place_hinge`] once the foil is known.
pub(super) fn flap(sheet: &Sheet, row: &Row, reach: Option<&Reach>, problems: &mut Problems) -> Option<Flap> {
    let (from, to) = stretch(row, "the flap", reach, problems)?;
    let fractions = [row.number("hinge"), row.number("hinge-end")];
    let lengths = [row.length("hinge"), row.length("hinge-end")];
    let measured_from = row.text("hinge-from").and_then(HingeFrom::from_word)?;
    let (hinge, hinge_end, hinge_lengths) = match (fractions, lengths) {
        ([Some(hinge), end], [None, None]) => {
            if row.gives("hinge-from") {
                let wrong = Wrong::new(
                    "hinge-from is for a hinge that is given as a length: a fraction counts from the nose",
                )
                .help("write the hinge as a length, or leave hinge-from out");
                problems.add(row.place("hinge-from"), wrong);
            }
            (hinge, end.unwrap_or(hinge), None)
        }
        ([None, None], [Some(hinge), end]) => {
            (0.0, 0.0, Some((measured_from, [hinge, end.unwrap_or(hinge)])))
        }
        ([None, _], [None, _]) => return None,
        _ => {
            let wrong = Wrong::new("one end of the hinge is a fraction of the chord and the other a length")
                .help("write both as fractions, or both as lengths");
            problems.add(row.place("hinge-end"), wrong);
            return None;
        }
    };
    Some(Flap {
        hinge,
        hinge_end,
        hinge_lengths,
        kind: row.text("kind").and_then(FlapKind::from_word)?,
        axis: row.number("axis")?,
        up: row.angle("up")?,
        down: row.angle("down")?,
        clearance: row.length("clearance")?,
        face: row.length("face")?,
        horn: row.length("horn"),
        face_material: strength::named(sheet, row, "face-material", problems),
        from,
        to,
    })
}

/// Where on the chord a hinge may lie, fractions from the nose.
const HINGE: [f64; 2] = [0.3, 0.95];

/// Fills in the fractions of a hinge that is given as lengths; notes where it lies off the section.
pub(super) fn place_hinge(design: &mut Design, row: &Row, problems: &mut Problems) {
    let (Some(line), Ok(wing)) = (design.hinge_line(), design.wing()) else { return };
    let Some(flap) = design.flap.as_mut() else { return };
    let Some((measured_from, _)) = flap.hinge_lengths else { return };
    let fraction = |at: f64| {
        let chord = wing.chord_at(at);
        line.x_at(at, chord) / chord
    };
    (flap.hinge, flap.hinge_end) = (fraction(line.from), fraction(line.to));
    let mut places = wing.even_places();
    places.retain(|at| line.from < *at && *at < line.to);
    places.extend([line.from, line.to]);
    let off = |at: &f64| (fraction(*at).clamp(HINGE[0], HINGE[1]) - fraction(*at)).abs();
    let Some(worst) = places.into_iter().max_by(|a, b| off(a).total_cmp(&off(b))) else { return };
    if off(&worst) > 1e-9 {
        let chord = wing.chord_at(worst);
        let at_nose = |fraction: f64| Length::from_mm(0.1 * (10.0 * fraction * chord).round());
        let at_edge = |fraction: f64| at_nose(1.0 - fraction);
        let (what, least, most) = match measured_from {
            HingeFrom::Nose => ("nose", at_nose(HINGE[0]), at_nose(HINGE[1])),
            HingeFrom::TrailingEdge => ("trailing edge", at_edge(HINGE[1]), at_edge(HINGE[0])),
        };
        let x = Length::from_mm(line.x_at(worst, chord));
        let x = if measured_from == HingeFrom::Nose { x } else { Length::from_mm(chord - x.mm()) };
        let message = format!(
            "the hinge lies {x} from the {what} where the chord is {} mm, at {} mm from the root: it lies from {} to {} of the chord",
            crate::units::number(chord, 1),
            crate::units::number(worst, 1),
            HINGE[0],
            HINGE[1],
        );
        let help = format!("there \"{least}\" to \"{most}\" would do");
        problems.add(row.place("hinge"), Wrong::new(message).help(help));
    }
}

/// From where to where along the span something goes; to the far end where that is left out.
pub(super) fn stretch(
    row: &Row,
    what: &str,
    reach: Option<&Reach>,
    problems: &mut Problems,
) -> Option<(Length, Length)> {
    let from = row.length("from")?;
    let to = row.length("to").or(reach.map(|reach| reach.to))?;
    if let Some(reach) = reach {
        reach.holds(&format!("{what}'s end"), to, row.place("to"), problems);
    }
    if to.mm() <= from.mm() + SAME {
        let wrong = Wrong::new(format!("{what} runs from {from} to {to}, and leaves nothing between"))
            .help("from lies nearer to the root than to");
        problems.add(row.place("from"), wrong);
    }
    Some((from, to))
}

/// What of a cut-out is wanted, or a note that it is missing.
fn wanted<T>(
    row: &Row,
    key: &str,
    value: Option<T>,
    whose: &str,
    example: &str,
    problems: &mut Problems,
) -> Option<T> {
    if value.is_none() && !row.gives(key) {
        let wrong = Wrong::new(format!("{key} is missing: {whose} wants it"))
            .help(format!("write {key} = {example}"));
        problems.add(row.header(), wrong);
    }
    value
}

pub(super) fn cut(row: &Row, reach: Option<&Reach>, problems: &mut Problems) -> Option<Cut> {
    let (kind, depth) = (row.text("kind").and_then(CutKind::from_word)?, row.length("depth")?);
    let across = kind == CutKind::Slot && row.text("along") == Some("chord");
    let whose = match kind {
        CutKind::Slot if across => "a slot along the chord",
        CutKind::Slot => "a slot",
        CutKind::Bore => "a bore",
        CutKind::Pocket => "a pocket",
        CutKind::Hole => "a hole",
    };
    if matches!(kind, CutKind::Slot | CutKind::Pocket) && depth.mm() <= 0.0 {
        let wrong = Wrong::new(format!("{whose} has a depth")).help("write depth = \"6 mm\"");
        problems.add(row.place("depth"), wrong);
    }
    let width = match kind {
        CutKind::Pocket => Length::from_mm(0.0),
        _ => wanted(row, "width", row.length("width"), whose, "\"8 mm\"", problems)?,
    };
    let chord = if across || kind == CutKind::Pocket {
        let from = wanted(row, "chord-from", row.number("chord-from"), whose, "0.15", problems);
        let to = wanted(row, "chord-to", row.number("chord-to"), whose, "0.45", problems);
        let (from, to) = (from?, to?);
        if to <= from {
            let message =
                format!("{whose} runs from {from} to {to} of the chord, and leaves nothing between");
            let help = "chord-from lies nearer to the nose than chord-to";
            problems.add(row.place("chord-from"), Wrong::new(message).help(help));
        }
        Some([from, to])
    } else {
        None
    };
    let at = match chord {
        Some([from, to]) => 0.5 * (from + to),
        None => wanted(row, "at", row.number("at"), whose, "0.3", problems)?,
    };
    let (from, to) = if across || kind == CutKind::Hole {
        let middle = wanted(row, "span-at", row.length("span-at"), whose, "\"30 mm\"", problems)?;
        let ends = [-0.5, 0.5].map(|half| Length::from_mm(middle.mm() + half * width.mm()));
        if let Some(reach) = reach {
            reach.holds(&format!("the far side of {whose}"), ends[1], row.place("span-at"), problems);
        }
        if ends[0].mm() < 0.0 && kind == CutKind::Hole {
            let message = format!("the hole reaches {} beyond the root", Length::from_mm(-ends[0].mm()));
            let help =
                format!("span-at = \"{}\" or more keeps it on the foil", Length::from_mm(0.5 * width.mm()));
            problems.add(row.place("span-at"), Wrong::new(message).help(help));
        }
        (Length::from_mm(ends[0].mm().max(0.0)), ends[1])
    } else {
        stretch(row, "the cut", reach, problems)?
    };
    Some(Cut {
        purpose: row.text("for")?.to_owned(),
        kind,
        chord,
        at,
        width,
        depth,
        from_upper: row.text("face")? == "upper",
        height: row.number("height")?,
        from,
        to,
        least_left: row.length("least-left")?,
    })
}
