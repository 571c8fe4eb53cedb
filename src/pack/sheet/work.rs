//! The order of work, the checks and the files.

use std::fmt::Write as _;

use crate::design::Design;
use crate::export::html::table;
use crate::pack::{Check, PackFile, checks};
use crate::units::number;

/// The word for a check that does not hold.
const OUTSIDE: &str = "OUTSIDE";

pub(super) fn steps(body: &mut String, design: &Design, files: &[PackFile]) {
    let count = |kind: &str| files.iter().filter(|file| file.kind == kind).count();
    let (pages, routed, plates) = (count("pdf"), count("dxf"), count("stl"));
    let mut steps = vec![
        "Read the checks below. For each that is outside its limit, change the design, or know why you go on."
            .to_owned(),
    ];
    if pages > 0 {
        steps.push(
            "Print <code>print/*.pdf</code> at 100 %, with fitting to the page off, and measure both 100 mm lines on \
             every page. Join tiles by laying cross on cross."
                .to_owned(),
        );
    }
    if routed > 0 {
        steps.push(format!(
            "Send the sheets in <code>cut/</code> to the router, or the pieces one by one: {routed} files, in millimetres, each of \
             which says whether the cutter's radius is still to be set off. Layers are named for what is done to them: CUT_OUTSIDE, \
             CUT_INSIDE, POCKET with its depth, DRILL, ENGRAVE; the others are never cut."
        ));
    }
    if plates > 0 {
        let sides = if design.kind.mirrored() {
            ""
        } else {
            " On this upright foil the upper half is the starboard one, the lower half the port one."
        };
        steps.push(format!(
            "Print the {plates} mask halves in <code>masks/</code> flat as they lie, without support. Station, fingerprint and \
             half are engraved; notches in the far side show nose, trailing edge and hinge.{sides}"
        ));
    }
    if stations_are_marked(files) {
        let wood =
            files.iter().any(|file| file.role.ends_with("template") && file.role != "station template");
        if wood {
            steps.push(
                "Saw out the blanks, mark the root line and the stations on them from the planform, and shape the wood to \
                 the templates of the wood. Test fit, with the spacer, before any resin is mixed."
                    .to_owned(),
            );
            steps.push(
                "Laminate as in the table of plies, on a sample first: measure its cured thickness and correct the design if it \
                 differs."
                    .to_owned(),
            );
        } else {
            steps.push(
                "Cut the planform, mark the root line and the stations on it, and shape down to the masks."
                    .to_owned(),
            );
        }
        steps.push(
            "Fill and sand to the masks. When a pair closes, the gap all round is the set clearance."
                .to_owned(),
        );
        steps.push(
            "Set the twist: on each template the line marked \u{201c}level\u{201d} lies level when the foil does. The table \
             above gives the height of each nose against the root's."
                .to_owned(),
        );
        steps.push("Between stations, fair the surface with a straight batten.".to_owned());
    }
    body.push_str("<h2>Order of work</h2>\n<ol>\n");
    for step in steps {
        let _ = writeln!(body, "<li>{step}</li>");
    }
    body.push_str("</ol>\n");
}

/// Whether the pack holds anything to shape by.
fn stations_are_marked(files: &[PackFile]) -> bool {
    files.iter().any(|file| matches!(file.kind, "dxf" | "pdf" | "stl"))
}

pub(super) fn check_table(body: &mut String, checks: &[Check]) {
    let rows: Vec<[String; 6]> = checks::worst_first(checks)
        .map(|check| {
            let quantity = |v: f64| format!("{} {}", number(v, 3), check.unit).trim_end().to_owned();
            [
                if check.passed { "passed" } else { OUTSIDE }.to_owned(),
                check.name.clone(),
                check.place.clone(),
                quantity(check.value),
                quantity(check.limit),
                check.why.clone(),
            ]
        })
        .collect();
    body.push_str("<h2>Checks</h2>\n");
    let heading = ["", "check", "where", "value", "limit", "why"];
    body.push_str(&table(heading, &rows, |row| row[0] == OUTSIDE));
}

pub(super) fn file_table(body: &mut String, files: &[PackFile]) {
    let rows: Vec<[String; 3]> = files
        .iter()
        .map(|file| {
            let station = file.station_mm.map_or(String::new(), |at| format!("{} mm", number(at, 3)));
            [file.path.clone(), file.role.to_owned(), station]
        })
        .collect();
    body.push_str("<h2>Files of this pack</h2>\n");
    body.push_str(&table(["file", "what it is", "station"], &rows, |_| false));
}
