//! Masks and pages against what they are made from.

use plankform::geometry::{ArcPath, Point, Vec2, follow_with_arcs};
use plankform::section::{Section, TrailingEdge};
use plankform::wing::{Station, Wing};
use plankform::workshop::{Drawing, Mask, MaskMarks, MaskSettings, PaperSettings, Role, single_page, tiled};
use proptest::prelude::*;

fn foil(name: &str, edge: TrailingEdge, chord: f64) -> Wing {
    let section = Section::from_designation(name, edge).expect("a section");
    let station = |at| Station {
        at,
        chord,
        section: section.clone(),
        twist: 0.02,
        sweep: 0.0,
        rise: 0.0,
        twist_about: 0.25,
    };
    Wing::new(vec![station(0.0), station(100.0)], false).expect("a foil")
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(120))]

    /// A pair of plates is a block less the outline moved out by the clearance. A plain contour of
    /// area A and length L moved out by d has the area A + L d + pi d² (J. Steiner, 1840).
    #[test]
    fn masks_are_a_block_less_the_opening(
        camber in 0u8..=6,
        position in 2u8..=6,
        thickness in 6u32..=24,
        closed in any::<bool>(),
        chord in 30.0..400.0f64,
        clearance in 0.05..3.0f64,
    ) {
        let digits = if camber == 0 { "00".to_owned() } else { format!("{camber}{position}") };
        let edge = if closed { TrailingEdge::Closed } else { TrailingEdge::Published };
        let wing = foil(&format!("NACA {digits}{thickness:02}"), edge, chord);
        let shape = wing.shape_at(40.0).unwrap();
        let settings = MaskSettings { clearance, wall: 8.0, thickness: 5.0, tolerance: 0.01, bed: [1000.0, 1000.0] };
        let outline = follow_with_arcs(&shape, 0.001).unwrap();
        let mask = Mask::of(&outline, settings, MaskMarks { label: "", sights: &[] }).unwrap();
        let [upper, lower] = [&mask.pieces[0].plate.solid, &mask.pieces[1].plate.solid];

        let length: f64 = outline.segments().map(|s| s.length()).sum();
        let opening = outline.area() + length * clearance + std::f64::consts::PI * clearance * clearance;
        let bounds = outline.bounds().inflate(clearance + 8.0, clearance + 8.0);
        // A peg of 0.4 by 0.22 walls in each parting face, its flanks leaning in by 0.15; its socket is
        // wider by 0.15 mm each side and deeper by as much. Five letters of the half are engraved.
        let peg = |play: f64| {
            let (half, depth) = (0.2 * 8.0 + play, 0.22 * 8.0 + play);
            depth * (2.0 * half - 0.15 * depth)
        };
        let expected = 5.0 * (bounds.area() - opening + 2.0 * (peg(0.0) - peg(0.15)));
        let engraved = |half: &str| 0.8 * engraved_area(half, 8.0, bounds.width());
        let found = upper.volume() + lower.volume() + engraved("upper") + engraved("lower");
        // The opening may stray by the tolerance all along.
        prop_assert!((found - expected).abs() < 5.0 * 0.02 * (length + 4.0), "{} for {}", found, expected);
        for half in [upper, lower] {
            let [x, y, z] = half.size();
            prop_assert!((x - bounds.width()).abs() < 0.05 && y < bounds.height() && z == 5.0);
            prop_assert!(half.volume() > 0.0);
        }
    }
}

/// What the strokes of a label take of the wall: 3.6 mm letters (0.45 of it), a stroke of 0.15 of that.
/// Only their number and lengths matter here: straight strokes of the segments of each letter.
fn engraved_area(label: &str, wall: f64, width: f64) -> f64 {
    let letters = label.len() as f64 + 1.0;
    let height = (0.45 * wall).min((width - wall) / ((letters - 1.0) * 0.9 + 0.7));
    if height < 2.4 {
        return 0.0;
    }
    // Long, half and level strokes of u, p, e, r and l, o, w, e, r; the slanting one of the r.
    // Each ends in points a stroke's half long, which hold half of what a square end would.
    let level = (0.56 - 2.0 * 0.035 - 0.075) * height;
    let half_level = (0.28 - 2.0 * 0.035 - 0.075) * height;
    let upright = (0.425 - 2.0 * 0.035 - 0.075) * height;
    let slanting = (0.28_f64.hypot(0.425) - 2.0 * (0.15 + 0.035)) * height;
    let counts = |c: char| match c {
        // Uprights, level ones over the whole width, over half of it, slanting ones.
        'u' => [4, 1, 0, 0],
        'p' => [3, 1, 2, 0],
        'e' => [2, 2, 1, 0],
        'r' => [3, 1, 2, 1],
        'l' => [2, 1, 0, 0],
        'o' => [4, 2, 0, 0],
        // The middle one of w is shorter by half a stroke and a gap.
        _ => [5, 1, 0, 0],
    };
    let lengths = [upright, level, half_level, slanting];
    let all = label.chars().flat_map(|c| counts(c).into_iter().zip(lengths));
    let shorter = label.chars().filter(|c| *c == 'w').count() as f64 * (0.075 + 0.035) * height;
    (all.map(|(count, length)| f64::from(count) * length).sum::<f64>() - shorter) * 0.15 * height
}

fn drawing(width: f64, height: f64) -> Drawing {
    let corners = [(0.0, 0.0), (width, 0.0), (width, height), (0.0, height)];
    let mut drawing = Drawing::new("A plain rectangle");
    drawing.add(Role::CutOutside, ArcPath::polyline(corners.map(Point::from), true));
    drawing
}

/// ISO 216: A4 is 210 by 297 mm.
const A4: PaperSettings = PaperSettings { width: 210.0, height: 297.0, margin: 10.0, overlap: 10.0 };

#[test]
fn tiles_cover_the_drawing_and_join_at_their_marks() {
    for (width, height) in [(20.0, 10.0), (900.0, 140.0), (400.0, 700.0), (150.0, 250.0)] {
        let drawing = drawing(width, height);
        let pages = tiled(&drawing, A4);
        // Where each page's window lies in the drawing.
        let windows: Vec<_> = pages
            .iter()
            .map(|page| {
                let shift = page.drawing.bounds().origin() - drawing.bounds().origin();
                page.window - shift
            })
            .collect();
        for i in 0..=60 {
            for j in 0..=60 {
                let point = Point::new(width * f64::from(i) / 60.0, height * f64::from(j) / 60.0);
                let seen = windows.iter().any(|w| w.inflate(1e-9, 1e-9).contains(point));
                assert!(seen, "{width} by {height}: {point:?} is on no page");
            }
        }
        // Every match mark of one page lies on another page too, at the same place.
        let marks: Vec<Vec<Point>> = pages
            .iter()
            .zip(&windows)
            .map(|(page, window)| {
                let shift = page.window.origin() - window.origin();
                let inside = page.furniture.lines.iter().map(|l| l.path.bounds());
                inside.filter(|b| page.window.contains(b.center())).map(|b| b.center() - shift).collect()
            })
            .collect();
        for (i, own) in marks.iter().enumerate() {
            assert_eq!(own.is_empty(), pages.len() == 1);
            for mark in own {
                let others = marks.iter().enumerate().filter(|(j, _)| *j != i).flat_map(|(_, m)| m);
                let met = others.filter(|other| other.distance(*mark) < 1e-9).count();
                assert!(met >= 1, "{width} by {height}: page {i} has a mark that no other page has");
            }
        }
    }
    assert_eq!(tiled(&drawing(20.0, 10.0), A4).len(), 1);
    // A roll takes the planform in one piece, along the roll, and no more of it than that needs.
    let roll = PaperSettings { width: 610.0, height: f64::INFINITY, ..A4 };
    let [page] = tiled(&drawing(900.0, 140.0), roll).try_into().expect("one page");
    assert!(
        (page.width, page.height) == (934.0, 610.0) || page.width == 610.0 && page.height > 900.0,
        "{page:?}"
    );
    assert!(page.window.width() >= 900.0);
    // Two widths of it for what is wider, and each as long as it needs.
    let pages = tiled(&drawing(900.0, 700.0), roll);
    assert_eq!(pages.len(), 2);
    // An overlap that leaves no room gives no pages rather than endless ones.
    assert!(tiled(&drawing(20.0, 10.0), PaperSettings { overlap: 500.0, ..A4 }).is_empty());
}

#[test]
fn every_page_carries_both_check_lines() {
    let mut pages = tiled(&drawing(900.0, 140.0), A4);
    pages.push(single_page(&drawing(20.0, 10.0)));
    for page in pages {
        let lengths: Vec<Vec2> = page
            .furniture
            .lines
            .iter()
            .flat_map(|line| line.path.segments().map(|s| s.to - s.from).collect::<Vec<_>>())
            .filter(|v| v.hypot() > 50.0)
            .collect();
        assert_eq!(lengths, [Vec2::new(100.0, 0.0), Vec2::new(0.0, 100.0)]);
        let paper = kurbo::Rect::new(0.0, 0.0, page.width, page.height);
        for line in &page.furniture.lines {
            assert_eq!(paper.intersect(line.path.bounds()), line.path.bounds(), "on the paper");
        }
    }
}
