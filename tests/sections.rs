//! Published sections against the printed tables and their own equations.

use plankform::geometry::Curve;
use plankform::section::{Section, SectionError, Side, TrailingEdge};

fn published(designation: &str) -> Section {
    Section::from_designation(designation, TrailingEdge::Published).expect("a published section")
}

#[test]
fn debug_numbers() {
    for name in ["NACA 0012", "NACA 4412", "NACA 23012", "NACA 23112", "NACA 6409"] {
        let s = published(name);
        println!("{name} {:?}", s.numbers());
        println!("{} {}", s.surface(Side::Upper, 0.6) * 100.0, s.surface(Side::Lower, 0.6) * 100.0);
    }
}
