//! Router files: both releases, layouts, what is done about the cutter.

use std::f64::consts::{FRAC_1_SQRT_2, PI};

use plankform::export::{Curves, Flavour, dxf};
use plankform::geometry::{ArcPath, ArcVertex, Point, Rect};
use plankform::workshop::{
    Corners, Drawing, Role, RouterSettings, StockPiece, StockSettings, engrave, on_stock, routed,
    tightest_inside,
};

const PLAIN: RouterSettings =
    RouterSettings { cutter: 6.0, is_path: false, corners: Corners::Sharp, tabs: 0, tab_width: 6.0 };

fn rectangle(x: f64, y: f64, width: f64, height: f64) -> ArcPath {
    let corners = [(x, y), (x + width, y), (x + width, y + height), (x, y + height)];
    ArcPath::polyline(corners.map(Point::from), true)
}

fn circle(centre: Point, radius: f64) -> ArcPath {
    let ends = [-radius, radius].map(|x| ArcVertex { point: Point::new(centre.x + x, centre.y), bulge: 1.0 });
    ArcPath::new(ends.to_vec(), true)
}

/// A plate of 200 by 60 with a slot of 40 by 20 in it.
fn plate() -> Drawing {
    let mut drawing = Drawing::new("plate");
    drawing.add(Role::CutOutside, rectangle(0.0, 0.0, 200.0, 60.0));
    drawing.add(Role::CutInside, rectangle(80.0, 20.0, 40.0, 20.0));
    drawing
}

fn of_role(drawing: &Drawing, role: Role) -> Vec<&ArcPath> {
    drawing.lines.iter().filter(|line| line.role == role).map(|line| &line.path).collect()
}

/// The path of the middle of a round cutter about a rectangle is longer by its circle, and encloses more by
/// its radius times the outline and its circle (J. Steiner, 1840).
#[test]
fn the_cutters_radius_is_set_off_where_asked() {
    let same = routed(&plate(), PLAIN).expect("routed");
    assert_eq!(same.lines, plate().lines);
    let moved = routed(&plate(), RouterSettings { is_path: true, ..PLAIN }).expect("routed");
    let outside = of_role(&moved, Role::CutOutside)[0];
    assert!((outside.area() - (200.0 * 60.0 + 520.0 * 3.0 + PI * 9.0)).abs() < 1e-6);
    assert_eq!(of_role(&moved, Role::CutInside)[0].bounds(), Rect::new(83.0, 23.0, 117.0, 37.0));
}

/// A square tenon of the slot's size must go in: no part of its corners is left, and walls lose only what
/// the relief takes.
#[test]
fn relieved_corners_let_a_square_tenon_in() {
    for corners in [Corners::DogBone, Corners::TBone] {
        let relieved = routed(&plate(), RouterSettings { corners, ..PLAIN }).expect("routed");
        let slot = of_role(&relieved, Role::CutInside)[0];
        let fine = slot.flattened(1e-4);
        let within = |x: f64, y: f64| plankform::geometry::polygon::contains(&fine, Point::new(x, y));
        let hair = 1e-3;
        for (x, y) in [(80.0, 20.0), (120.0, 20.0), (120.0, 40.0), (80.0, 40.0)] {
            let inwards = [(100.0_f64 - x).signum() * hair, (30.0_f64 - y).signum() * hair];
            assert!(within(x + inwards[0], y + inwards[1]), "{corners:?}: {x}, {y} is left in");
        }
        // The cutter reaches every place of the relief: no radius is smaller than its own.
        let tightest = slot.segments().filter_map(|s| s.radius()).fold(f64::INFINITY, f64::min);
        assert!((tightest - 3.0).abs() < 1e-9);
        let bounds = slot.bounds();
        let beyond = match corners {
            // The circle's centre lies r/√2 inside of both walls.
            Corners::DogBone => [3.0 * (1.0 - FRAC_1_SQRT_2); 2],
            // Into the short walls, those at the ends, alone.
            _ => [3.0, 0.0],
        };
        assert!((80.0 - bounds.x0 - beyond[0]).abs() < 1e-9, "{bounds:?}");
        assert!((20.0 - bounds.y0 - beyond[1]).abs() < 1e-9, "{bounds:?}");
    }
}

#[test]
fn a_slot_that_stands_proud_is_relieved_inside_alone() {
    let mut drawing = Drawing::new("notch");
    drawing.add(Role::CutOutside, rectangle(0.0, 0.0, 200.0, 60.0));
    drawing.add(Role::CutInside, rectangle(80.0, 50.0, 40.0, 11.0));
    let relieved = routed(&drawing, RouterSettings { corners: Corners::DogBone, ..PLAIN }).expect("routed");
    let arcs = of_role(&relieved, Role::CutInside)[0].segments().filter(|s| s.radius().is_some()).count();
    assert_eq!(arcs, 2);
}

#[test]
fn holes_that_the_cutter_fills_are_drilled() {
    let mut drawing = plate();
    drawing.add(Role::CutInside, circle(Point::new(20.0, 30.0), 2.5));
    drawing.add(Role::CutInside, circle(Point::new(180.0, 30.0), 4.0));
    let ready = routed(&drawing, PLAIN).expect("routed");
    assert_eq!(of_role(&ready, Role::Drill).len(), 1);
    assert_eq!(of_role(&ready, Role::CutInside).len(), 2);
}

#[test]
fn tabs_lie_on_the_contour_and_apart() {
    let ready = routed(&plate(), RouterSettings { tabs: 4, ..PLAIN }).expect("routed");
    let (outside, tabs) = (of_role(&ready, Role::CutOutside)[0], of_role(&ready, Role::Tab));
    assert_eq!(tabs.len(), 4);
    assert!(outside.is_closed());
    for tab in &tabs {
        let length: f64 = tab.segments().map(|s| s.length()).sum();
        assert!((length - 6.0).abs() < 1e-9 && !tab.is_closed());
        assert!(tab.segments().all(|s| outside.distance(s.at(0.5)) < 1e-9));
    }
    // Tabs never take more than a quarter of a small piece.
    let mut small = Drawing::new("small");
    small.add(Role::CutOutside, rectangle(0.0, 0.0, 20.0, 10.0));
    let ready = routed(&small, RouterSettings { tabs: 20, ..PLAIN }).expect("routed");
    assert_eq!(of_role(&ready, Role::Tab).len(), 2);
}

#[test]
fn inside_radii_are_found() {
    assert_eq!(tightest_inside(&circle(Point::ORIGIN, 5.0)), None);
    let corners = [(0.0, 0.0), (10.0, 0.0), (10.0, 4.0), (4.0, 4.0), (4.0, 10.0), (0.0, 10.0)];
    let angle = tightest_inside(&ArcPath::polyline(corners.map(Point::from), true)).expect("a corner");
    assert_eq!((angle.radius, angle.at), (0.0, Point::new(4.0, 4.0)));
    // A cove of 2 mm in the upper side.
    let mut cove: Vec<ArcVertex> = [(0.0, 0.0), (10.0, 0.0), (10.0, 8.0), (7.0, 8.0)]
        .map(|p| ArcVertex { point: p.into(), bulge: 0.0 })
        .to_vec();
    cove[3].bulge = -1.0;
    cove.extend([(3.0, 8.0), (0.0, 8.0)].map(|p| ArcVertex { point: p.into(), bulge: 0.0 }));
    // Its ends are corners that bulge; the arc is the only hollow.
    let found = tightest_inside(&ArcPath::new(cove, true)).expect("a hollow");
    assert!((found.radius - 2.0).abs() < 1e-9, "{found:?}");
}

#[test]
fn sheets_keep_the_grain_and_tell_what_is_too_large() {
    let piece = |name: &str, width: f64, height: f64| {
        let mut drawing = Drawing::new(name);
        drawing.add(Role::CutOutside, rectangle(-7.0, 3.0, width, height));
        StockPiece { name: name.to_owned(), drawing }
    };
    let stock = StockSettings { length: 300.0, width: 200.0, margin: 10.0, spacing: 12.0, may_turn: false };
    let pieces = [
        piece("a", 120.0, 40.0),
        piece("b", 120.0, 40.0),
        piece("tall", 40.0, 220.0),
        piece("c", 250.0, 100.0),
    ];
    let kept = on_stock("t", "n", &pieces, stock);
    assert_eq!(kept.too_large, ["tall"]);
    assert_eq!(kept.sheets.iter().map(|sheet| sheet.pieces.len()).sum::<usize>(), 3);
    let turned = on_stock("t", "n", &pieces, StockSettings { may_turn: true, ..stock });
    assert!(turned.too_large.is_empty());
    for layout in [kept, turned] {
        for sheet in &layout.sheets {
            let room = Rect::new(10.0, 10.0, 290.0, 190.0).inflate(1e-9, 1e-9);
            for path in of_role(&sheet.drawing, Role::CutOutside) {
                assert_eq!(room.intersect(path.bounds()), path.bounds());
            }
            let whole = Rect::new(0.0, 0.0, 300.0, 200.0);
            assert_eq!(sheet.drawing.bounds().union(whole), whole, "words and all lie on the sheet");
            let area: f64 = of_role(&sheet.drawing, Role::CutOutside).iter().map(|path| path.area()).sum();
            assert!((sheet.used - area / 60_000.0).abs() < 1e-12);
        }
    }
}

#[test]
fn names_are_engraved_within_the_piece_or_not_at_all() {
    let mut drawing = plate();
    assert!(engrave(&mut drawing, &["112.5 MAIN 3F9A-01C7".to_owned()]));
    let strokes = of_role(&drawing, Role::Engrave);
    assert!(strokes.len() > 60);
    let slot = rectangle(80.0, 20.0, 40.0, 20.0).bounds();
    for stroke in strokes {
        let bounds = stroke.bounds();
        let inside = Rect::new(1.0, 1.0, 199.0, 59.0);
        assert_eq!(inside.union(bounds), inside);
        assert!(slot.intersect(bounds).area() == 0.0);
    }
    let mut small = Drawing::new("small");
    small.add(Role::CutOutside, rectangle(0.0, 0.0, 9.0, 3.0));
    let before = small.clone();
    assert!(!engrave(&mut small, &["112.5".to_owned()]));
    assert_eq!(small, before);
}

/// The same contours, by the reader of the dxf crate, from both releases.
#[test]
fn a_second_reader_finds_the_same_contours_in_both_releases() {
    let mut drawing = plate();
    drawing.add(Role::CutInside, circle(Point::new(180.0, 30.0), 4.0));
    drawing.add(Role::pocket(6.5), rectangle(10.0, 10.0, 20.0, 20.0));
    drawing.write(Role::Label, Point::new(0.0, -10.0), 4.0, "twist −1.5°");
    let read = |flavour| {
        let text = dxf(&drawing, flavour, Curves::Arcs);
        assert!(text.is_ascii());
        ::dxf::Drawing::load(&mut text.as_bytes()).expect("it reads")
    };
    let contours = |file: &::dxf::Drawing| -> Vec<(String, bool, Vec<[f64; 3]>)> {
        let of = |entity: &::dxf::entities::Entity| {
            let layer = entity.common.layer.clone();
            match &entity.specific {
                ::dxf::entities::EntityType::LwPolyline(line) => {
                    let corners = line.vertices.iter().map(|v| [v.x, v.y, v.bulge]).collect();
                    Some((layer, line.is_closed(), corners))
                }
                ::dxf::entities::EntityType::Polyline(line) => {
                    let corners = line.vertices().map(|v| [v.location.x, v.location.y, v.bulge]).collect();
                    Some((layer, line.is_closed(), corners))
                }
                _ => None,
            }
        };
        file.entities().filter_map(of).collect()
    };
    let (new, old) = (read(Flavour::R2000), read(Flavour::R12));
    assert_eq!(old.header.version, ::dxf::enums::AcadVersion::R12);
    assert_eq!(new.header.version, ::dxf::enums::AcadVersion::R2000);
    assert_eq!(contours(&new), contours(&old));
    let layers: Vec<String> = contours(&old).into_iter().map(|(layer, ..)| layer).collect();
    assert_eq!(layers, ["CUT_OUTSIDE", "CUT_INSIDE", "CUT_INSIDE", "POCKET_6_5MM"]);
    assert!(contours(&old).iter().all(|(_, closed, corners)| *closed && corners.len() >= 2));
}
