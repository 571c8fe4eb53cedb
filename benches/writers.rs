//! Each writer of workshop files, in MB/s, against plain writing of the same bytes to a file.
//!
//! Both are timed in turn in the same run, so that the ratio holds on a machine whose speed drifts.

#![allow(clippy::print_stdout, reason = "a bench reports on standard output")]
#![allow(clippy::unwrap_used, reason = "a bench may stop at the first surprise")]

use std::fs;
use std::time::{Duration, Instant};

use plankform::export::{Curves, Flavour, dxf, pdf, stl, svg_page};
use plankform::geometry::{ArcPath, follow_with_arcs};
use plankform::section::{Section, TrailingEdge};
use plankform::wing::{Station, Wing};
use plankform::workshop::{
    Drawing, Mask, MaskMarks, MaskSettings, Page, Role, Stamp, single_page, station_template,
};

const ROUNDS: usize = 101;
/// Outlines in the drawing that is written: a full sheet of stock.
const PIECES: usize = 60;

fn main() {
    let section = Section::from_designation("NACA 4412", TrailingEdge::Published).unwrap();
    let station = |at| Station {
        at,
        chord: 140.0,
        section: section.clone(),
        twist: 0.0,
        sweep: 0.0,
        rise: 0.0,
        twist_about: 0.25,
    };
    let wing = Wing::new(vec![station(0.0), station(100.0)], false).unwrap();
    let shape = wing.shape_at(0.0).unwrap();
    let outline: ArcPath = follow_with_arcs(&shape, 0.01).unwrap();
    let stamp = Stamp { design: "Bench".to_owned(), fingerprint: "0000-0000".to_owned() };
    let template = station_template(&stamp, &shape, &outline, None, true);
    let mut sheet = Drawing::new("sheet");
    for i in 0..PIECES {
        let by = plankform::geometry::Affine::translate((0.0, 30.0 * i as f64));
        sheet.add(Role::CutOutside, outline.transformed(by));
    }
    let pages: Vec<Page> = (0..PIECES).map(|_| single_page(&template)).collect();
    let settings =
        MaskSettings { clearance: 0.3, wall: 12.0, thickness: 6.0, tolerance: 0.01, bed: [220.0, 220.0] };
    let marks = MaskMarks { label: "0 0000-0000", sights: &[0.0, 140.0] };
    let mask = Mask::of(&outline, settings, marks).unwrap();

    println!("medians of {ROUNDS}; plain: the same bytes written to a file in the same run");
    report("DXF 2000", &|| dxf(&sheet, Flavour::R2000, Curves::Arcs).into_bytes());
    report("DXF R12", &|| dxf(&sheet, Flavour::R12, Curves::Arcs).into_bytes());
    report("SVG", &|| pages.iter().map(svg_page).collect::<String>().into_bytes());
    report("PDF", &|| pdf("bench", &pages).unwrap());
    report("STL", &|| mask.solids().flat_map(|solid| stl(solid, "bench").unwrap()).collect());
}

fn report(name: &str, write: &dyn Fn() -> Vec<u8>) {
    let folder = tempfile::tempdir().unwrap();
    let bytes = write();
    let (mut made, mut plain) = (Vec::new(), Vec::new());
    for round in 0..ROUNDS {
        made.push(timed(|| drop(write())));
        let path = folder.path().join(format!("{round}"));
        plain.push(timed(|| fs::write(&path, &bytes).unwrap()));
    }
    let rate = |time: Duration| bytes.len() as f64 / 1e6 / time.as_secs_f64();
    let (made, plain) = (median(made), median(plain));
    println!(
        "  {name:10} {:8.1} kB  made {:8.1} MB/s  plain {:8.1} MB/s  made to plain {:6.3}",
        bytes.len() as f64 / 1e3,
        rate(made),
        rate(plain),
        rate(made) / rate(plain)
    );
}

fn timed(work: impl FnOnce()) -> Duration {
    let start = Instant::now();
    work();
    start.elapsed()
}

fn median(mut times: Vec<Duration>) -> Duration {
    times.sort_unstable();
    times[times.len() / 2]
}
