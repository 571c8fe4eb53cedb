//! From the values of a file to the ends of the foil: the shaped tip, the case and the waterline.

use super::model::{Hands, Kind, Station, Tip, TipShape};
use super::reader::Row;
use super::resolve::Reach;
use crate::problems::{Problems, Wrong};
use crate::units::Length;
use crate::wing::TipForm;

/// Whether two parts are made or one.
pub(super) fn hands(row: &Row, kind: Kind) -> Hands {
    let usual = if kind.mirrored() { Hands::Mirrored } else { Hands::OneHanded };
    row.text("hands").and_then(Hands::from_word).unwrap_or(usual)
}

/// The shaped tip, `None` for a square one, or a note that it does not go on the foil.
pub(super) fn tip(row: &Row, last: &Station, reach: Option<&Reach>, problems: &mut Problems) -> Option<Tip> {
    let form = match row.text("tip").and_then(TipShape::from_word)? {
        TipShape::Shaped(form) => form,
        TipShape::Square => {
            let given = ["tip-length", "tip-chord", "tip-about"].into_iter().find(|key| row.gives(key));
            if let Some(key) = given {
                let wrong = Wrong::new(format!("{key} is for a tip that is shaped, and this one is square"))
                    .help("write tip = \"rounded\" or \"cut\"");
                problems.add(row.place(key), wrong);
            }
            return None;
        }
    };
    let about = row.number("tip-about").unwrap_or(if form == TipForm::Rounded { 0.5 } else { 1.0 });
    let part = |share: f64| Length::from_mm(share * last.chord.mm());
    let (length, chord) =
        (row.length("tip-length").unwrap_or(part(0.5)), row.length("tip-chord").unwrap_or(part(1.0 / 3.0)));
    if let Some(reach) = reach.filter(|reach| length.mm() >= reach.to.mm()) {
        let message = format!("the tip takes up {length} of the span, but {}", reach.because);
        let help = format!("\"{}\" is half of it", Length::from_mm(0.5 * reach.to.mm()));
        problems.add(row.place("tip-length"), Wrong::new(message).help(help));
    }
    if chord.mm() >= last.chord.mm() {
        let message = format!("the tip leaves a chord of {chord} where the last station has {}", last.chord);
        let help = format!("less than \"{}\" draws it together", last.chord);
        problems.add(row.place("tip-chord"), Wrong::new(message).help(help));
    }
    Some(Tip { form, length, chord, about })
}

/// Where the case ends and where the water's surface lies.
pub(super) fn case_and_waterline(
    row: &Row,
    kind: Kind,
    reach: Option<&Reach>,
    problems: &mut Problems,
) -> Option<[Length; 2]> {
    let in_case = row.length("in-case")?;
    let waterline = row.length("waterline").unwrap_or(in_case);
    for (key, what, place) in
        [("in-case", "the end of the case", in_case), ("waterline", "the waterline", waterline)]
    {
        if !row.gives(key) {
            continue;
        }
        if kind.mirrored() {
            let wrong = Wrong::new(format!("{key} is for what stands upright: a strut or a fin"))
                .help(format!("leave {key} out"));
            problems.add(row.place(key), wrong);
        } else if let Some(reach) = reach {
            reach.holds(what, place, row.place(key), problems);
            if (reach.to.mm() - 1.0..=reach.to.mm()).contains(&place.mm()) {
                let wrong = Wrong::new(format!(
                    "{what} lies at {place}, and {}: nothing is left below it",
                    reach.because
                ))
                .help("it lies nearer to the upper end");
                problems.add(row.place(key), wrong);
            }
        }
    }
    if waterline.mm() < in_case.mm() {
        let message = format!("the waterline lies at {waterline}, inside the case that ends at {in_case}");
        let help = format!("write waterline = \"{in_case}\" or more");
        problems.add(row.place("waterline"), Wrong::new(message).help(help));
    }
    Some([in_case, waterline])
}
