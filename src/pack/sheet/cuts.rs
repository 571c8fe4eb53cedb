//! What is taken out of the wood.

use crate::design::CutKind;
use crate::export::html::{escaped, table};
use crate::pack::wood::{CutFigure, opens};
use crate::units::number;

pub(super) fn cuts(body: &mut String, cuts: &[CutFigure<'_>]) {
    if cuts.is_empty() {
        return;
    }
    let rows: Vec<[String; 7]> = cuts
        .iter()
        .map(|figure| {
            let cut = figure.cut;
            let (width, depth) = (number(cut.width.mm(), 2), number(cut.depth.mm(), 2));
            let (kind, size) = match (cut.kind, cut.chord) {
                (CutKind::Slot, None) => ("slot", format!("{width} wide, {depth} deep")),
                (CutKind::Slot, Some(_)) => ("slot along the chord", format!("{width} wide, {depth} deep")),
                (CutKind::Bore, _) => ("bore", format!("{width} across")),
                (CutKind::Pocket, _) => ("pocket", format!("{depth} deep")),
                (CutKind::Hole, _) if cut.depth.mm() > 0.0 => {
                    ("hole", format!("{width} across, {depth} deep"))
                }
                (CutKind::Hole, _) => ("hole", format!("{width} across")),
            };
            let percent = |share: f64| number(100.0 * share, 1);
            let chord = match cut.chord {
                Some([from, to]) => format!("{} to {}", percent(from), percent(to)),
                None => format!("at {}", percent(cut.at)),
            };
            [
                escaped(&cut.purpose),
                kind.to_owned(),
                opens(cut).to_owned(),
                size,
                format!("{} to {}", number(cut.from.mm(), 1), number(cut.to.mm(), 1)),
                chord,
                format!("{:.1} at {}", figure.wood_left, number(figure.at, 1)),
            ]
        })
        .collect();
    let heading = [
        "what for",
        "cut-out",
        "opens",
        "size, mm",
        "along the span, mm from the root",
        "of the chord, %",
        "least wood left, mm, and where",
    ];
    body.push_str("<h3>Slots, bores and pockets</h3>\n");
    body.push_str(&table(heading, &rows, |_| false));
}
