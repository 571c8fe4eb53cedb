//! The ends of the foil, what the water touches, and how fair a batten lies.

use std::fmt::Write as _;

use crate::design::{Design, Hands};
use crate::export::html::table;
use crate::pack::surface::{FAIRING, Surface};
use crate::units::number;
use crate::wing::TipForm;

pub(super) fn ends(body: &mut String, design: &Design, surface: &Surface) {
    let mut said = Vec::new();
    if let Some(tip) = design.tip {
        let (form, edges) = match tip.form {
            TipForm::Rounded => ("Rounded", "both edges run in quarter ellipses"),
            TipForm::Cut => ("Cut", "the edges run straight"),
        };
        let about = match tip.about {
            0.0 => "the nose".to_owned(),
            1.0 => "the trailing edge".to_owned(),
            about => format!("{} % of the chord", number(100.0 * about, 1)),
        };
        said.push(format!(
            "{form} tip: over the last {} mm of the span {edges} towards {about}, and {} mm of chord are left at the end. Saw it \
             to the planform, sand its sections down with the chord, and round the end over by hand.",
            number(tip.length.mm(), 1),
            number(tip.chord.mm(), 1),
        ));
    }
    match surface.immersed {
        None => {
            said.push(format!("The water touches {:.0} cm² of skin, both sides.", surface.wetted / 100.0))
        }
        Some(immersed) => {
            let (case, waterline) = (design.in_case.mm(), design.waterline.mm());
            let length = design.reach().mm() - waterline;
            let in_case = if case > 0.0 {
                format!("The upper {} mm stay in the case. ", number(case, 1))
            } else {
                String::new()
            };
            said.push(format!(
                "{in_case}In the water: {} mm from {} mm on, {:.0} cm² seen from the side, {:.0} cm² of skin.",
                number(length, 1),
                number(waterline, 1),
                immersed / 100.0,
                surface.wetted / 100.0
            ));
            if design.hands == Hands::Mirrored {
                said.push(
                    "Two are made, a left one and a right one. The templates are those of the one shown; turn them over for the other."
                        .to_owned(),
                );
            }
        }
    }
    let _ = writeln!(body, "<p>{}</p>", said.join("</p>\n<p>"));
    if surface.battens.is_empty() {
        return;
    }
    let limit = design.fairing.map_or(FAIRING, |fairing| fairing.mm());
    let mut rows: Vec<[String; 3]> = surface
        .battens
        .iter()
        .map(|(from, to, gap)| [number(*from, 1), number(*to, 1), format!("{gap:.2}")])
        .collect();
    if let Some(gap) = surface.over_tip {
        let at = [design.reach().mm() - design.tip.map_or(0.0, |tip| tip.length.mm()), design.reach().mm()];
        let [from, to] = at.map(|at| number(at, 1));
        rows.push([from, to, format!("{gap:.2}, over the tip: work it to the planform")]);
    }
    let places: Vec<String> = surface.fewest.iter().map(|at| number(*at, 1)).collect();
    let _ = writeln!(
        body,
        "<p>The foil is curved between its stations, and a straight batten from one template to the next is not on it. The \
         fewest templates that keep it within {} mm are {}: at {} mm.</p>",
        number(limit, 2),
        places.len(),
        places.join(", ")
    );
    body.push_str(&table(["batten from, mm", "to, mm", "furthest from the design, mm"], &rows, |_| false));
}
