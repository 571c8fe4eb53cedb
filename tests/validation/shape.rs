//! Sections, laminate and paper.

use super::page::{Part, Unit, row};
use super::{greatest, numbers, parsed};
use plankform::geometry::{ArcPath, Curve, Point, follow_with_arcs};
use plankform::parts::{Core, Covers, Laminate, Ply};
use plankform::section::{Section, Side, TrailingEdge};
use plankform::wing::{Station, Wing};
use plankform::workshop::{Drawing, PaperSettings, Role, tiled};

fn section(name: &str) -> Section {
    Section::from_designation(&format!("NACA {name}"), TrailingEdge::Published).expect("a section")
}

fn name(entry: &toml::Value) -> &str {
    entry["name"].as_str().expect("a name")
}

fn sections_of<'a>(table: &'a toml::Table, group: &str) -> (&'a toml::Value, &'a Vec<toml::Value>) {
    (&table[group], table[group]["section"].as_array().expect("sections"))
}

/// Printed ordinates; percent of chord.
pub(crate) fn sections() -> Part {
    let plain = parsed(include_str!("../reference/sections.toml"));
    let families = parsed(include_str!("../reference/families.toml"));
    let off = |name: &str, side: Side, stations: &[f64], print: &[f64]| {
        let section = section(name);
        // The last station is the end of the surface, which lies off x = 1 by a trace.
        let rows = stations.iter().zip(print).filter(|(x, _)| **x < 100.0);
        greatest(rows.map(|(x, y)| 100.0 * section.surface(side, x / 100.0) - y))
    };
    let (table, entries) = sections_of(&plain, "symmetric");
    let stations = numbers(&table["stations"]);
    let symmetric = entries.iter().map(|s| off(name(s), Side::Upper, &stations, &numbers(&s["ordinates"])));
    let (table, entries) = sections_of(&plain, "cambered");
    let stations = numbers(&table["stations"]);
    let (mut print, mut computed) = (0.0_f64, 0.0_f64);
    for entry in entries {
        for (side, key) in [(Side::Upper, "upper"), (Side::Lower, "lower")] {
            print = print.max(off(name(entry), side, &stations, &numbers(&entry[key])));
            let key = format!("{key}_computed");
            computed = computed.max(off(name(entry), side, &stations, &numbers(&entry[&key])));
        }
    }
    let (table, entries) = sections_of(&families, "thickness");
    let stations = numbers(&table["stations"]);
    let modified =
        |entry: &toml::Value| off(name(entry), Side::Upper, &stations, &numbers(&entry["computed"]));
    Part {
        heading: "Sections",
        source: "ordinates of I. H. Abbott, A. E. von Doenhoff and L. S. Stivers, NACA Report 824, 1945, in percent of chord; the \
                 equations of Reports 460, 492, 537 and 610, worked out apart from the program.",
        rows: vec![
            row(
                "symmetric four-digit sections, print of three decimals",
                0.000_55,
                greatest(symmetric),
                Unit::Plain(5),
            ),
            row("cambered four- and five-digit sections, their equations", 0.000_1, computed, Unit::Plain(5)),
            row(
                "… the print of two decimals, with the scatter of its hand computation",
                None,
                print,
                Unit::Plain(3),
            ),
            row(
                "modified forms and 16-series, their equations",
                0.000_01,
                greatest(entries.iter().map(modified)),
                Unit::Plain(6),
            ),
        ],
        pictures: Vec::new(),
    }
}

fn foil(section: &Section) -> Wing {
    let station = |at: f64| Station {
        at,
        chord: 120.0,
        section: section.clone(),
        twist: 0.0,
        sweep: 0.0,
        rise: 0.0,
        twist_about: 0.25,
    };
    Wing::new(vec![station(0.0), station(300.0)], true).expect("a foil")
}

/// Least distance from a point to an outline, closed in on.
fn distance(curve: &impl Curve, point: Point) -> f64 {
    let at = |t: f64| curve.jet(t.clamp(-1.0, 1.0)).point.distance(point);
    let share = |i: i32| f64::from(i) / 1000.0 - 1.0;
    let best = (0..=2000).min_by(|&a, &b| at(share(a)).total_cmp(&at(share(b)))).expect("points");
    let (mut low, mut high) = (share(best - 1), share(best + 1));
    for _ in 0..60 {
        let (a, b) = (low + (high - low) / 3.0, high - (high - low) / 3.0);
        if at(a) < at(b) { high = b } else { low = a }
    }
    at(0.5 * (low + high))
}

/// What the shop cuts and prints by.
pub(crate) fn shop() -> Part {
    const SKIN: f64 = 0.7;
    let (mut core_off, mut path_off) = (0.0_f64, 0.0_f64);
    for name in ["0012", "4412", "23112", "16-209"] {
        let wing = foil(&section(name));
        let shape = wing.shape_at(100.0).expect("a shape");
        let ply = Ply { thickness: SKIN, covers: Covers::Both, span: 0.0..=1000.0, chord: 0.0..=1.0 };
        let laminate = Laminate { plies: vec![ply], finish: 0.0, rise: 5.0 };
        let core = Core::of(&shape, &laminate).expect("a core");
        let points = (0..=200).map(|i| core.jet(f64::from(i) / 100.0 - 1.0).point);
        core_off = core_off.max(greatest(points.map(|point| distance(&shape, point) - SKIN)));
        let contour = follow_with_arcs(&core, 0.01).expect("a contour");
        path_off =
            path_off.max(greatest(contour.vertices().iter().map(|v| distance(&shape, v.point) - SKIN)));
    }
    let mut drawing = Drawing::new("A plain rectangle");
    let corners = [(0.0, 0.0), (900.0, 0.0), (900.0, 140.0), (0.0, 140.0)];
    drawing.add(Role::CutOutside, ArcPath::polyline(corners.map(Point::from), true));
    let paper = PaperSettings { width: 210.0, height: 297.0, margin: 10.0, overlap: 10.0 };
    let pages = tiled(&drawing, paper);
    let lines = pages
        .iter()
        .flat_map(|page| page.furniture.lines.iter())
        .flat_map(|line| line.path.segments().map(|s| (s.to - s.from).hypot()).collect::<Vec<_>>());
    let check = greatest(lines.filter(|length| *length > 50.0).map(|length| length - 100.0));
    Part {
        heading: "Wood and paper",
        source: "the distance from the finished outline, found on its equations, at 120 mm chord; the length of the check lines on each \
                 page. How the written files measure is held by the outside checks (tests/outside): DXF, PDF, SVG and STL \
                 read back with other people's libraries.",
        rows: vec![
            row("the core lies the laminate's thickness inside", 0.01, core_off, Unit::Millimetres(4)),
            row("… the router's contour of it", 0.01, path_off, Unit::Millimetres(4)),
            row("100 mm lines on tiled paper", 0.02, check, Unit::Millimetres(4)),
        ],
        pictures: Vec::new(),
    }
}
