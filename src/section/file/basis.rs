//! What a section file's section comes from: equations, a family, points or a blend.

use std::ops::Range;

use toml::de::DeTable;

use super::expressions::Expressions;
use super::reader::{Raw, Reader, Wronged, span_of};
use super::{Beside, Placed};
use crate::problems::Wrong;
use crate::section::{Finish, MeanLine, Section, Side, ThicknessForm, TrailingEdge, UniformLoad};

const FAMILY_KEYS: &[&str] = &[
    "line",
    "camber",
    "camber-at",
    "design-lift",
    "a",
    "form",
    "thickness",
    "thickness-at",
    "nose",
    "trailing-edge",
];
const LINES: &[&str] = &["straight", "four-digit", "five-digit", "five-digit-reflexed", "uniform-load"];
const FORMS: &[&str] = &["four-digit", "modified"];

/// The section before it is changed, and the place in the file that shapes it.
pub(super) fn read(
    reader: &mut Reader<'_>,
    root: &DeTable<'_>,
    name: String,
    beside: &Beside<'_>,
) -> Option<Placed<Section>> {
    // Constants are looked at whether they are used or not.
    let mut expressions = Expressions::new(reader, root);
    let groups: [(&'static str, &'static [&'static str]); 4] = [
        ("upper and lower", &["upper", "lower"]),
        ("[coordinates]", &["coordinates"]),
        ("[blend]", &["blend"]),
        ("camber, thickness and [family]", &["camber", "thickness", "family"]),
    ];
    let named = |keys: &'static [&'static str]| keys.iter().find(|key| root.contains_key(**key)).copied();
    let given: Vec<(&str, &str)> =
        groups.iter().filter_map(|(group, keys)| Some((*group, named(keys)?))).collect();
    if let [(first, _), (second, key), ..] = given[..] {
        let message = format!("{second} stands beside {first}: a section comes from one of them");
        expressions.reader.wrong(span_of(root, key), message, "leave one of them out");
        return None;
    }
    match given.first().map_or("", |(group, _)| group) {
        "upper and lower" => surfaces(&mut expressions, root, name),
        "[coordinates]" => coordinates(reader, root.get("coordinates")?, beside),
        "[blend]" => blend(reader, root.get("blend")?, name, beside),
        _ => laid(&mut expressions, root, name),
    }
}

/// A thickness across a mean line, each from equations or from a family.
fn laid(expressions: &mut Expressions<'_, '_>, root: &DeTable<'_>, name: String) -> Option<Placed<Section>> {
    let written = [("camber", "y"), ("thickness", "t")]
        .map(|(key, value)| root.get(key).map(|raw| expressions.equations(key, value, raw)));
    let [camber, thickness] = written;
    let line = camber.map(|read| {
        read.and_then(|(equations, places)| expressions.noted(MeanLine::from_equations(equations), &places))
    });
    let form = thickness.map(|read| {
        read.and_then(|(equations, places)| {
            expressions.noted(ThicknessForm::from_equations(equations), &places)
        })
    });
    let (line, form) = match root.get("family") {
        Some(raw) => {
            let reader = &mut *expressions.reader;
            let table = reader.table("family", raw)?;
            reader.refuse_unknown(table, FAMILY_KEYS, "[family]");
            for (key, written) in [("line", line.is_some()), ("form", form.is_some())] {
                if written && table.contains_key(key) {
                    let message = format!("{key} stands beside an expression for the same");
                    reader.wrong(span_of(table, key), message, "leave one of them out");
                    return None;
                }
            }
            let of_family = match line {
                Some(written) => written,
                None => family_line(reader, table, raw).ok(),
            };
            let form = match form {
                Some(written) => written,
                None => family_form(reader, table, raw).ok(),
            };
            (of_family, form)
        }
        None => {
            if form.is_none() {
                let help = "write thickness = \"0.3*sqrt(x)*(1 - x)\", or what yours is: the full thickness over x, in chords; or a [family], [coordinates] or [blend]";
                expressions.reader.wrong(0..0, "thickness is missing", help);
            }
            (line.unwrap_or(Some(MeanLine::Straight)), form.flatten())
        }
    };
    let made = Section::new(name, line?, form?)
        .and_then(|section| section.refuse_crossing_surfaces().map(|()| section));
    let place = ["camber", "family", "thickness"].into_iter().find(|key| root.contains_key(*key));
    let place = place.map_or(0..0, |key| span_of(root, key));
    noted(expressions.reader, made, place)
}

fn family_line(reader: &mut Reader<'_>, table: &DeTable<'_>, raw: &Raw<'_>) -> Result<MeanLine, Wronged> {
    let line = reader.word(table, "line", LINES);
    let camber = reader.share(table, "camber", -0.15..=0.15);
    let at = reader.share(table, "camber-at", 0.02..=0.95);
    let lift = reader.number(table, "design-lift", -2.0..=2.0);
    let a = reader.number(table, "a", 0.0..=1.0);
    let line = line?;
    // What this line takes; anything else of these beside it would be silently without effect.
    let takes: &[&str] = match line {
        "four-digit" => &["camber", "camber-at"],
        "five-digit" | "five-digit-reflexed" => &["design-lift", "camber-at"],
        "uniform-load" => &["design-lift", "a"],
        _ => &[],
    };
    for key in ["camber", "camber-at", "design-lift", "a"] {
        if takes.contains(&key) && !table.contains_key(key) {
            return reader.missing(raw.span(), key, &format!("a {line} line takes {}", takes.join(" and ")));
        }
        if !takes.contains(&key) && table.contains_key(key) {
            let message = format!("{key} has no effect on a {line} line");
            let help = match takes {
                [] => format!("write line = \"{}\" or another, or leave it out", LINES[1]),
                _ => format!("a {line} line takes {}", takes.join(" and ")),
            };
            reader.wrong(span_of(table, key), message, help);
            return Err(Wronged);
        }
    }
    let (camber, at, lift, a) =
        (camber?.unwrap_or(0.0), at?.unwrap_or(0.0), lift?.unwrap_or(0.0), a?.unwrap_or(0.0));
    match line {
        "straight" => Ok(MeanLine::Straight),
        "four-digit" => Ok(MeanLine::FourDigit { camber, position: at }),
        "uniform-load" => UniformLoad::new(a, lift).map(MeanLine::UniformLoad).ok_or_else(|| {
            reader.wrong(
                span_of(table, "a"),
                format!("there is no line a = {a}"),
                "a is 0, or lies from 0.02 to 1",
            );
            Wronged
        }),
        _ => MeanLine::five_digit_at(lift, at, line.ends_with("reflexed")).map_err(|error| {
            reader.problems.add(span_of(table, "camber-at"), Wrong::new(error.to_string()));
            Wronged
        }),
    }
}

fn family_form(
    reader: &mut Reader<'_>,
    table: &DeTable<'_>,
    raw: &Raw<'_>,
) -> Result<ThicknessForm, Wronged> {
    let form = reader.word(table, "form", FORMS);
    let thickness = reader.share(table, "thickness", 0.005..=0.4);
    let at = reader.share(table, "thickness-at", 0.2..=0.6);
    let nose = reader.number(table, "nose", 1.0..=9.0);
    let edge = reader.word(table, "trailing-edge", &["published", "closed"]);
    let edge = if edge? == "closed" { TrailingEdge::Closed } else { TrailingEdge::Published };
    let Some(thickness) = thickness? else {
        return reader.missing(raw.span(), "thickness", "write thickness = 0.12, or thickness = \"12 %\"");
    };
    let (at, nose) = (at?, nose?);
    if form? == "modified" {
        let Some(at) = at else {
            return reader.missing(
                raw.span(),
                "thickness-at",
                "a modified form has its greatest thickness at 0.2 to 0.6 of the chord",
            );
        };
        return ThicknessForm::modified(thickness, nose.unwrap_or(6.0), at, edge).ok_or_else(|| {
            let help = "6 is the usual nose; a number from 1 to 8, or 9 for three times the usual radius";
            reader.wrong(span_of(table, "nose"), "there is no such nose", help);
            Wronged
        });
    }
    for key in ["thickness-at", "nose"] {
        if table.contains_key(key) {
            let help = "write form = \"modified\"; or set the place under [work]";
            reader.wrong(span_of(table, key), format!("{key} has no effect on the four-digit form"), help);
            return Err(Wronged);
        }
    }
    Ok(ThicknessForm::four_digit(thickness, edge))
}

fn surfaces(
    expressions: &mut Expressions<'_, '_>,
    root: &DeTable<'_>,
    name: String,
) -> Option<Placed<Section>> {
    let [upper, lower] = ["upper", "lower"].map(|key| match root.get(key) {
        Some(raw) => expressions.equations(key, "y", raw),
        None => {
            let help = format!("write {key} = \"…\", the height of that surface over x");
            expressions.reader.wrong(0..0, format!("{key} is missing beside the other surface"), help);
            None
        }
    });
    let ((upper, upper_places), (lower, lower_places)) = (upper?, lower?);
    let made = Section::from_surfaces(name, upper, lower);
    let section = match made {
        Ok(section) => section,
        Err((side, error)) => {
            let places = if side == Side::Upper { upper_places } else { lower_places };
            return expressions.noted(Err(error), &places);
        }
    };
    let checked = section.refuse_crossing_surfaces().map(|()| section);
    noted(expressions.reader, checked, span_of(root, "upper"))
}

fn coordinates(reader: &mut Reader<'_>, raw: &Raw<'_>, beside: &Beside<'_>) -> Option<Placed<Section>> {
    let table = reader.table("coordinates", raw)?;
    reader.refuse_unknown(table, &["file", "tolerance"], "[coordinates]");
    let file = reader.text(table, "file").ok()?;
    let tolerance = reader.share(table, "tolerance", 1e-7..=0.01).ok()?;
    let Some(file) = file else {
        let help =
            "write file = \"friend.txt\", a table of points or a traced outline (.dxf) beside this file";
        reader.wrong(raw.span(), "file is missing", help);
        return None;
    };
    noted(reader, beside.coordinates(&file, tolerance), span_of(table, "file"))
}

fn blend(
    reader: &mut Reader<'_>,
    raw: &Raw<'_>,
    name: String,
    beside: &Beside<'_>,
) -> Option<Placed<Section>> {
    let table = reader.table("blend", raw)?;
    reader.refuse_unknown(table, &["first", "second", "share", "trailing-edge"], "[blend]");
    let share = reader.share(table, "share", 0.0..=1.0);
    let edge = reader.word(table, "trailing-edge", &["published", "closed"]);
    let texts = ["first", "second"].map(|key| reader.text(table, key));
    let edge = if edge.ok()? == "closed" { Finish::Closed } else { Finish::Published };
    let mut sections = Vec::new();
    for (key, text) in ["first", "second"].into_iter().zip(texts) {
        let Some(text) = text.ok()? else {
            let help = format!("write {key} = \"NACA 2412\", or the name of a section file");
            reader.wrong(raw.span(), format!("{key} is missing"), help);
            return None;
        };
        sections.push(noted(reader, beside.named(&text, edge), span_of(table, key)));
    }
    let Some(share) = share.ok()? else {
        reader.wrong(raw.span(), "share is missing", "write share = 0.5, how much of the second there is");
        return None;
    };
    let [Some((first, _)), Some((second, _))] = &sections[..] else { return None };
    noted(reader, Section::blend(name, first, second, share), raw.span())
}

fn noted<E: std::fmt::Display>(
    reader: &mut Reader<'_>,
    made: Result<Section, E>,
    place: Range<usize>,
) -> Option<Placed<Section>> {
    made.map_err(|error| reader.problems.add(place.clone(), Wrong::new(error.to_string())))
        .ok()
        .map(|section| (section, place))
}
