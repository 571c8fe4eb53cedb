//! The build sheet: what to check, what to print and cut, in which order, with the pictures.
//!
//! A section of it stands in a file of its own.

mod boat;
mod cuts;
mod ends;
mod flow;
mod shape;
mod strength;
mod work;
mod workshop;

use std::fmt::Write as _;

use super::aids::Aids;
use super::{Check, PackFile};
use crate::design::Design;
use crate::export::html::{document, escaped};
use crate::units::knots;

/// White round a picture, mm.
const MARGIN: f64 = 4.0;

pub(super) fn html(design: &Design, aids: &Aids<'_>, checks: &[Check], files: &[PackFile]) -> String {
    let Aids { planform, pattern, legend, stations, flows, water, curves, duty, pieces, .. } = aids;
    let mut body = String::new();
    heading(&mut body, design, checks);
    cautions(&mut body);
    shape::shape(&mut body, design, planform, stations, (pattern, legend));
    ends::ends(&mut body, design, &aids.surface);
    shape::wood(&mut body, design, stations, pieces);
    cuts::cuts(&mut body, &aids.wood.cuts);
    strength::strength(&mut body, design, &aids.strength);
    if let Some(foil) = duty {
        boat::under_the_boat(&mut body, design, foil);
    }
    flow::friction(&mut body, design, water, curves);
    flow::cavitation(&mut body, design, water, curves);
    flow::lift(&mut body, design, flows);
    work::steps(&mut body, design, files);
    workshop::pieces_and_pages(&mut body, design, aids, files);
    work::check_table(&mut body, checks);
    work::file_table(&mut body, files);
    document(&format!("{} {}", design.name, design.fingerprint()), &body)
}

fn heading(body: &mut String, design: &Design, checks: &[Check]) {
    let failed = checks.iter().filter(|check| !check.passed).count();
    let verdict = if failed == 0 {
        format!("<p class=\"good\">All {} checks passed.</p>", checks.len())
    } else {
        format!(
            "<p class=\"bad\">{failed} of {} checks are outside their limit: see below before you cut.</p>",
            checks.len()
        )
    };
    let _ = writeln!(
        body,
        "<h1>{}</h1>\n<p>{}, fingerprint <code>{}</code>. Only aids with this fingerprint belong together.</p>\n{verdict}",
        escaped(&design.name),
        escaped(design.kind.word()),
        escaped(&design.fingerprint())
    );
    if let Some(notes) = &design.notes {
        let _ = writeln!(body, "<p>{}</p>", escaped(notes));
    }
}

fn cautions(body: &mut String) {
    body.push_str(
        "<div class=\"caution\"><strong>Before you start.</strong> Sanding dust of wood, filler and fibre harms the lungs: \
         mask and extraction. Uncured resin and hardener harm skin and eyes: gloves, goggles, air, and their data sheets; a \
         pot of mixed resin can catch fire. Guard and clamp for every cutter, and a dry run above the wood for a new file. \
         A foil at speed cuts: keep swimmers away, wear helmet and vest, start in sheltered water with a chase boat. What \
         is said here of lift, drag, cavitation and strength is computed: nothing of ventilation, waves, debris, impact or fatigue \
         is in it, and it is no certificate: local rules and qualified advice come first.</div>\n",
    );
}
