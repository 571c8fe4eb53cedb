//! What the tests of coordinates share: sections as tables, and how far a fit is from the equation.

#![allow(dead_code, reason = "each test file uses its own part")]

use plankform::geometry::{Affine, Curve, Point};
use plankform::section::coordinates::{Traced, from_table};
use plankform::section::{Section, TrailingEdge};

pub(crate) fn section(digits: &str, edge: TrailingEdge) -> Section {
    Section::from_designation(&format!("NACA {digits}"), edge).expect("a section")
}

pub(crate) fn table(points: &[Point], decimals: usize) -> String {
    points.iter().map(|p| format!("{:.decimals$} {:.decimals$}\n", p.x, p.y)).collect()
}

pub(crate) fn read(text: &str) -> Traced {
    from_table(text, "table.txt", None).unwrap_or_else(|error| panic!("{error}"))
}

/// Greatest distance of the fitted outline from the equation, in chords; `home` takes a point of
/// the file to where the equation has it.
pub(crate) fn apart(traced: &Traced, section: &Section, home: Affine) -> f64 {
    let mut most = 0.0_f64;
    let mut s = -1.0_f64;
    for i in -1000..=1000 {
        let t = f64::from(i) / 1000.0;
        let on = Point::new(t * t, traced.surfaces.at(t)[0]);
        let point = home * traced.report.placing.to_file(on);
        // The foot of it on the equation's own outline.
        for _ in 0..10 {
            let jet = section.jet(s);
            s += ((point - jet.point).dot(jet.first) / jet.first.hypot2()).clamp(-0.02, 0.02);
        }
        most = most.max(point.distance(section.jet(s).point));
    }
    most
}
