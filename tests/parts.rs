//! The core under its laminate: distances in the plane and in space, where the wood ends, weights.

use plankform::geometry::{Curve, Point, Vec2, follow_with_arcs};
use plankform::parts::{
    Core, Covers, CutOut, Hinge, HingeBy, HingeKind, HingeLine, Laminate, PartError, Ply, PlyMaterial,
    WoodPlan, split,
};
use plankform::section::{Section, Side, TrailingEdge};
use plankform::wing::{Station, Tip, TipForm, Wing};

/// A foil of two stations 300 mm apart.
fn foil(sections: [&str; 2], chords: [f64; 2], sweep: f64, twist: f64, edge: TrailingEdge) -> Wing {
    let station = |i: usize| Station {
        at: 300.0 * i as f64,
        chord: chords[i],
        section: Section::from_designation(sections[i], edge).expect("a section"),
        twist: twist.to_radians() * i as f64,
        sweep: sweep * i as f64,
        rise: 0.0,
        twist_about: 0.25,
    };
    Wing::new(vec![station(0), station(1)], true).expect("a foil")
}

fn plain(thickness: f64) -> Ply {
    Ply { thickness, covers: Covers::Both, span: 0.0..=1000.0, chord: 0.0..=1.0 }
}

fn laminate(plies: Vec<Ply>) -> Laminate {
    Laminate { plies, finish: 0.1, rise: 5.0 }
}

/// Least distance in the plane from a point to the finished outline, refined on the curve itself.
fn distance(curve: &impl Curve, point: Point) -> f64 {
    let at = |t: f64| curve.jet(t.clamp(-1.0, 1.0)).point.distance(point);
    let count = 4000;
    let share = |i: usize| 2.0 * i as f64 / f64::from(count) - 1.0;
    let best = (0..=4000).min_by(|&a, &b| at(share(a)).total_cmp(&at(share(b)))).expect("points");
    let (mut low, mut high) = (share(best.saturating_sub(1)), share((best + 1).min(4000)));
    for _ in 0..80 {
        let (a, b) = (low + (high - low) / 3.0, high - (high - low) / 3.0);
        if at(a) < at(b) { high = b } else { low = a }
    }
    at(0.5 * (low + high))
}

#[derive(serde::Deserialize)]
struct Structure {
    ply: Plies,
}

#[derive(serde::Deserialize)]
struct Plies {
    case: Vec<PlyCase>,
}

/// A worked example of `tests/reference/structure.toml`.
#[derive(serde::Deserialize)]
struct PlyCase {
    name: String,
    areal_weight_kg_m2: f64,
    fibre_density: f64,
    fibre_fraction: f64,
    matrix_density: f64,
    thickness_mm: f64,
    laminate_density: f64,
    laminate_mass_kg_m2: f64,
    resin_mass_kg_m2: f64,
}

/// Cured ply thickness and weight: fibre volume over its share, and the rule of mixtures, against the
/// worked examples in `tests/reference/structure.toml`.
#[test]
fn plies_have_the_thickness_of_their_fibre() {
    let text = include_str!("reference/structure.toml");
    let cases = toml::from_str::<Structure>(text).expect("the examples").ply.case;
    assert!(cases.len() >= 6);
    for case in cases {
        let ply = PlyMaterial {
            areal_weight: 1000.0 * case.areal_weight_kg_m2,
            fibre_density: case.fibre_density,
            resin_density: case.matrix_density,
            fibre_share: case.fibre_fraction,
        };
        let resin = ply.cured_weight() - case.areal_weight_kg_m2;
        for (what, found, expected, digits) in [
            ("thickness", ply.thickness(), case.thickness_mm, 1e-6),
            ("density", ply.density(), case.laminate_density, 1e-3),
            ("weight", ply.cured_weight(), case.laminate_mass_kg_m2, 1e-6),
            ("resin", resin, case.resin_mass_kg_m2, 1e-6),
        ] {
            assert!((found - expected).abs() < digits, "{}: {what} {found} {expected}", case.name);
        }
    }
    // Two unidirectional carbon plies as published for qualified aerospace prepregs (from memory): 134 g/m² of
    // fibre of 1770 kg/m³ at 57.7 % cures to 0.131 mm, 134 g/m² of 1790 kg/m³ at 57.4 % to 0.130 mm.
    for (fibre_density, fibre_share, published) in [(1770.0, 0.577, 0.131), (1790.0, 0.574, 0.130)] {
        let ply = PlyMaterial { areal_weight: 134.0, fibre_density, resin_density: 1300.0, fibre_share };
        assert!((ply.thickness() - published).abs() < 0.0006, "{} {published}", ply.thickness());
    }
}

/// On an untapered foil the skin's thickness lies between core and finished surface everywhere.
#[test]
fn every_point_of_the_core_lies_the_skin_inside() {
    for (section, edge) in [
        ("NACA 0012", TrailingEdge::Published),
        ("NACA 4412", TrailingEdge::Closed),
        ("NACA 23112", TrailingEdge::Published),
        ("NACA 16-209", TrailingEdge::Published),
    ] {
        for skin in [0.2, 0.7, 1.4] {
            let foil = foil([section; 2], [120.0; 2], 0.0, 0.0, edge);
            let laminate = laminate(vec![plain(skin)]);
            let shape = foil.shape_at(100.0).expect("a shape");
            let core = Core::of(&shape, &laminate).expect("a core");
            let mut worst: f64 = 0.0;
            for i in 0..=400 {
                let point = core.jet(f64::from(i) / 200.0 - 1.0).point;
                worst = worst.max((distance(&shape, point) - skin - 0.1).abs());
            }
            println!(
                "{section}, skin {skin} mm: off by {worst:.1e} mm, wood ends at {:.2} mm",
                core.tail().x
            );
            assert!(worst < 1e-6, "{section} {skin}: {worst}");
            // The router's contour too, within its own tolerance.
            let contour = follow_with_arcs(&core, 0.01).expect("a contour");
            assert!(contour.refuse_crossings(0.01).is_ok());
            for vertex in contour.vertices() {
                assert!((distance(&shape, vertex.point) - skin - 0.1).abs() < 0.01);
            }
        }
    }
}

/// On a tapered, twisted and swept foil the skin's thickness is square to the surface in space.
#[test]
fn the_allowance_is_square_to_a_surface_that_leans() {
    let foil = foil(["NACA 0018", "NACA 2409"], [180.0, 60.0], 30.0, -3.0, TrailingEdge::Published);
    let laminate = laminate(vec![plain(0.9)]);
    let at = 150.0;
    let shape = foil.shape_at(at).expect("a shape");
    let core = Core::of(&shape, &laminate).expect("a core");
    // The finished surface in the frame of the shape, near it: points at other places are brought
    // into its frame by what both know of the foil's own axes.
    let in_frame = |t: f64, y: f64| shape.jet(t).point + (y - at) * shape.spread(t);
    let (mut worst, mut plane): (f64, f64) = (0.0, 0.0);
    for i in 1..40 {
        let point = core.jet(f64::from(i) / 20.0 - 1.0).point;
        let mut best = (f64::INFINITY, 0.0, at);
        for j in 0..=1000 {
            let t = f64::from(j) / 500.0 - 1.0;
            for k in -5..=5 {
                let y = at + 0.3 * f64::from(k);
                let d = in_frame(t, y).distance(point).hypot(y - at);
                if d < best.0 {
                    best = (d, t, y);
                }
            }
        }
        let (mut step_t, mut step_y) = (2e-3, 0.3);
        for _ in 0..60 {
            for (dt, dy) in [
                (1.0, 0.0),
                (-1.0, 0.0),
                (0.0, 1.0),
                (0.0, -1.0),
                (1.0, 1.0),
                (-1.0, -1.0),
                (1.0, -1.0),
                (-1.0, 1.0),
            ] {
                let (t, y) = ((best.1 + dt * step_t).clamp(-1.0, 1.0), best.2 + dy * step_y);
                let d = in_frame(t, y).distance(point).hypot(y - at);
                if d < best.0 {
                    best = (d, t, y);
                }
            }
            (step_t, step_y) = (0.7 * step_t, 0.7 * step_y);
        }
        worst = worst.max((best.0 - 1.0).abs());
        plane = plane.max((distance(&shape, point) - 1.0).abs());
    }
    println!(
        "tapered foil: skin off by {worst:.1e} mm in space; in the plane it is up to {plane:.4} mm longer"
    );
    assert!(worst < 1e-3, "{worst}");
    assert!(plane > 0.005, "the lean makes no difference here");
}

#[test]
fn plies_count_where_they_lie() {
    let upper = Ply { covers: Covers::Upper, chord: 0.2..=0.6, ..plain(0.3) };
    let inner = Ply { span: 0.0..=120.0, ..plain(0.25) };
    let laminate = laminate(vec![plain(0.2), upper, inner]);
    let thickness = |side, at, x| laminate.thickness(side, at, x, 100.0)[0];
    for (side, at, x, expected) in [
        (Side::Upper, 50.0, 40.0, 0.85),
        (Side::Lower, 50.0, 40.0, 0.55),
        (Side::Upper, 200.0, 40.0, 0.6),
        (Side::Upper, 200.0, 10.0, 0.3),
        (Side::Upper, 200.0, 20.0, 0.3),
        (Side::Upper, 200.0, 22.5, 0.45),
        (Side::Upper, 200.0, 25.0, 0.6),
        (Side::Upper, 200.0, 57.5, 0.45),
        (Side::Upper, 200.0, 90.0, 0.3),
    ] {
        assert!((thickness(side, at, x) - expected).abs() < 1e-12, "{side:?} {at} {x}");
    }
    // The slope is that of the thickness.
    for x in [21.0, 23.0, 24.9, 56.0, 59.0] {
        let slope = (thickness(Side::Upper, 50.0, x + 1e-6) - thickness(Side::Upper, 50.0, x - 1e-6)) / 2e-6;
        assert!((laminate.thickness(Side::Upper, 50.0, x, 100.0)[1] - slope).abs() < 1e-7, "{x}");
    }
    let foil = foil(["NACA 2412"; 2], [100.0; 2], 0.0, 0.0, TrailingEdge::Published);
    let shape = foil.shape_at(200.0).expect("a shape");
    let core = Core::of(&shape, &laminate).expect("a core");
    for (x, t) in [(40.0, 0), (40.0, 1), (80.0, 0), (10.0, 1)].map(|(x, side)| (x, shape.roots_at(x)[side])) {
        let side = if t < 0.0 { Side::Upper } else { Side::Lower };
        let finished = shape.jet(t);
        let normal = finished.tangent().expect("a tangent").turn_90();
        let expected = finished.point + thickness(side, 200.0, x) * normal;
        let off = distance(&core, expected);
        assert!(off < 1e-6, "{side:?} {x}: {off}");
    }
    follow_with_arcs(&core, 0.01).expect("a contour");
}

#[test]
fn the_wood_ends_where_the_skins_meet() {
    let closed = foil(["NACA 0012"; 2], [100.0; 2], 0.0, 0.0, TrailingEdge::Closed);
    let shape = closed.shape_at(50.0).expect("a shape");
    let thin = laminate(vec![plain(0.4)]);
    let core = Core::of(&shape, &thin).expect("a core");
    assert!(core.ends_in_laminate());
    // The edge of the wood is the skin's thickness from both surfaces.
    assert!((distance(&shape, core.tail()) - 0.5).abs() < 1e-9);
    // Behind some place it is thinner than the shop can handle, and ahead of it not.
    let place = core.thin_behind(1.5).expect("a place");
    let thickness = |x: f64| 2.0 * (shape.jet(shape.roots_at(x)[0]).point.y - 0.5);
    assert!(place < core.tail().x && (thickness(place) - 1.5).abs() < 0.1, "{}", thickness(place));

    // A sharp nose under a thick skin: the wood begins in an edge there too.
    let sharp = foil(["NACA 0006"; 2], [100.0; 2], 0.0, 0.0, TrailingEdge::Published);
    let shape = sharp.shape_at(50.0).expect("a shape");
    let thick = laminate(vec![plain(0.7)]);
    let core = Core::of(&shape, &thick).expect("a core");
    assert!((distance(&shape, core.nose()) - 0.8).abs() < 1e-9, "{}", distance(&shape, core.nose()));
    let contour = follow_with_arcs(&core, 0.01).expect("a contour");
    assert!(contour.refuse_crossings(1e-3).is_ok() && contour.area() > 0.0);

    // And under one that is too thick there is none.
    let none = laminate(vec![plain(3.1)]);
    assert!(matches!(Core::of(&shape, &none), Err(PartError::NoCore { .. })));
}

/// A nose that bends more sharply than its skin is thick folds the core; the fold is trimmed, beside the nose
/// too, and what is left lies the skin's thickness inside.
#[test]
fn folds_at_the_nose_are_trimmed() {
    for (section, skin) in [("NACA 4412", 1.9), ("NACA 6412", 1.7), ("NACA 2409", 1.1), ("NACA 23012", 2.2)] {
        let foil = foil([section; 2], [100.0; 2], 0.0, 0.0, TrailingEdge::Published);
        let shape = foil.shape_at(50.0).expect("a shape");
        assert!(1.0 / shape.jet(0.0).curvature() < skin + 0.1, "{section} does not fold");
        let laminate = laminate(vec![plain(skin)]);
        let core = Core::of(&shape, &laminate).expect("a core");
        assert!((distance(&shape, core.nose()) - skin - 0.1).abs() < 1e-6, "{section}");
        let contour = follow_with_arcs(&core, 0.01).expect("a contour");
        assert!(contour.refuse_crossings(1e-3).is_ok() && contour.area() > 0.0, "{section}");
        for i in 0..=400 {
            let point = core.jet(f64::from(i) / 200.0 - 1.0).point;
            let off = distance(&shape, point) - skin - 0.1;
            assert!(off.abs() < 1e-5, "{section} {i}: {off}");
        }
    }
}

/// In a rounded tip the surface leans so much that the skin's share of the plane is a multiple of its
/// thickness; the wood keeps its distance in space all the same.
#[test]
fn the_skin_is_square_to_a_rounded_tip() {
    let foil = foil(["NACA 4412", "NACA 2412"], [140.0, 80.0], 20.0, -1.5, TrailingEdge::Published);
    let tip = Tip { form: TipForm::Rounded, length: 30.0, chord: 30.0, about: 0.5 };
    let foil = foil.with_tip(tip).expect("a tip");
    let laminate = laminate(vec![plain(0.2)]);
    // Points of the finished surface near the end, in space.
    let mut surface: Vec<[f64; 3]> = Vec::new();
    for i in 0..=400 {
        let at = 270.0 + 30.0 * f64::from(i) / 400.0;
        let shape = foil.shape_at(at).expect("a shape");
        surface.extend((0..=600).map(|j| {
            let p = shape.to_foil() * shape.jet(f64::from(j) / 300.0 - 1.0).point;
            [p.x, p.y, at]
        }));
    }
    for at in [275.0, 285.0, 293.0, 297.0] {
        let shape = foil.shape_at(at).expect("a shape");
        let core = Core::of(&shape, &laminate).expect("a core");
        for i in 1..40 {
            let p = shape.to_foil() * core.jet(f64::from(i) / 20.0 - 1.0).point;
            let distance =
                |q: &[f64; 3]| ((q[0] - p.x).powi(2) + (q[1] - p.y).powi(2) + (q[2] - at).powi(2)).sqrt();
            let least = surface.iter().map(distance).fold(f64::INFINITY, f64::min);
            // Points of the surface lie up to 0.25 mm apart, so they are up to 0.05 mm further off than it
            // is; it bends along the span, so that the lean alone is not quite all.
            assert!(least > 0.26 && least < 0.40, "{at} {i}: {least}");
        }
    }
    follow_with_arcs(&Core::of(&foil.shape_at(300.0).expect("a shape"), &laminate).expect("a core"), 0.01)
        .expect("a contour");
}

fn hinge(kind: HingeKind) -> Hinge {
    Hinge {
        at: 84.0,
        kind,
        up: 10.0_f64.to_radians(),
        down: 15.0_f64.to_radians(),
        face: 0.3,
        clearance: 0.5,
    }
}

/// Both pieces of either hinge are plain, lie in the finished section, and keep clear of each other
/// over the whole travel; the closing travel uses up the gap to the clearance and no further.
#[test]
fn a_split_foil_turns_freely() {
    let foil = foil(["NACA 2412"; 2], [120.0; 2], 0.0, 0.0, TrailingEdge::Published);
    let shape = foil.shape_at(100.0).expect("a shape");
    let laminate = laminate(vec![plain(0.5)]);
    let core = Core::of(&shape, &laminate).expect("a core");
    let whole = follow_with_arcs(&shape, 0.005).expect("an outline");
    for kind in [
        HingeKind::Laminate { side: Side::Upper },
        HingeKind::Laminate { side: Side::Lower },
        HingeKind::Pin { height: 0.5 },
        HingeKind::Pin { height: 0.3 },
        HingeKind::Pin { height: 0.8 },
    ] {
        let parts = split(&core, &hinge(kind), 0.005).expect("a split");
        println!(
            "{kind:?}: gap {:.3} mm at rest, {:.3} mm at {:.1}°, spacer {:?}",
            parts.gap_at_rest,
            parts.least_gap,
            parts.least_gap_at.to_degrees(),
            parts.spacer
        );
        assert!(parts.least_gap > 0.47, "{kind:?}: {}", parts.least_gap);
        if let HingeKind::Laminate { side } = kind {
            assert!((parts.least_gap - 0.5).abs() < 0.02, "{kind:?}: {}", parts.least_gap);
            let closing = if side == Side::Upper { 15.0 } else { -10.0 };
            assert!((parts.least_gap_at.to_degrees() - closing).abs() < 1e-9);
        }
        let mut area = 0.0;
        for piece in [&parts.main, &parts.flap] {
            for path in [&piece.core, &piece.finished] {
                assert!(path.area() > 0.0, "{kind:?} runs clockwise");
                assert!(path.refuse_crossings(0.005).is_ok(), "{kind:?} crosses itself");
            }
            assert!(piece.core.area() < piece.finished.area());
            area += piece.finished.area();
            // A cut face takes its own laminate: the wood keeps that far away from it.
            let least =
                piece.core.flattened(0.01).iter().map(|p| piece.finished.distance(*p)).fold(9.0, f64::min);
            let skin = if matches!(kind, HingeKind::Pin { .. }) { 0.3 } else { 0.0 };
            assert!(least > skin - 0.01, "{kind:?}: {least}");
        }
        assert!(area < whole.area() && area > 0.85 * whole.area(), "{kind:?}");
    }
}

#[test]
fn hinges_that_cannot_be_are_refused() {
    let foil = foil(["NACA 2412"; 2], [120.0; 2], 0.0, 0.0, TrailingEdge::Published);
    let shape = foil.shape_at(100.0).expect("a shape");
    let laminate = laminate(vec![plain(0.5)]);
    let core = Core::of(&shape, &laminate).expect("a core");
    let behind = Hinge { at: 119.0, ..hinge(HingeKind::Laminate { side: Side::Upper }) };
    assert!(matches!(split(&core, &behind, 0.01), Err(PartError::OffTheWood { .. })));
    let thick = Hinge { face: 9.0, ..hinge(HingeKind::Pin { height: 0.5 }) };
    assert!(matches!(split(&core, &thick, 0.01), Err(PartError::OffTheWood { .. })));
}

/// Prismatoids in closed form: a straight loft of one section with chords a and b over a length l holds
/// l (a² + a b + b²)/3 times the section's area at unit chord.
#[test]
fn volumes_agree_with_prismatoids() {
    let foil = foil(["NACA 2412"; 2], [120.0, 80.0], 10.0, 0.0, TrailingEdge::Published);
    let bare = Laminate { plies: vec![], finish: 0.0, rise: 5.0 };
    let plan = |laminate| WoodPlan {
        wing: &foil,
        joints: &[0.0, 300.0],
        laminate,
        hinge_at: &|_, _| None,
        parted: None,
        flap: None,
        cuts_at: &|_| Vec::new(),
        tolerance: 0.001,
    };
    let [whole] = &plan(&bare).pieces().expect("pieces")[..] else { panic!("one piece") };
    let unit =
        Section::from_designation("NACA 2412", TrailingEdge::Published).expect("a section").numbers().area;
    let exact = 300.0 * (120.0_f64.powi(2) + 120.0 * 80.0 + 80.0_f64.powi(2)) / 3.0 * unit;
    // What outlines within 0.001 mm can differ by: their length times that, along the span.
    let perimeter = 2.04 * 100.0;
    assert!((whole.volume - exact).abs() < perimeter * 0.001 * 300.0, "{} {exact}", whole.volume);
    assert_eq!((whole.name, whole.count), ("core", 2));
    assert!((whole.blank[0] - 300.0).abs() < 0.01 && whole.blank[1] > 120.0 && whole.blank[1] < 122.0);

    // Under a skin of constant thickness less wood, by the skin's share of the outline to first order;
    // in two pieces less by the gap between them.
    let skinned = laminate(vec![plain(0.4)]);
    let core = plan(&skinned).pieces().expect("pieces")[0].volume;
    assert!(((exact - core) / (0.5 * perimeter * 300.0) - 1.0).abs() < 0.05, "{}", exact - core);
    let hinge_at = |_: f64, chord: f64| {
        Some(Hinge { at: 0.7 * chord, ..hinge(HingeKind::Laminate { side: Side::Upper }) })
    };
    let parted = WoodPlan {
        hinge_at: &hinge_at,
        parted: Some([50.0, 250.0]),
        flap: Some([50.5, 249.5]),
        ..plan(&skinned)
    };
    let parted = parted.pieces().expect("pieces");
    assert_eq!(parted.iter().map(|piece| piece.name).collect::<Vec<_>>(), ["main body", "flap"]);
    assert!((parted[1].blank[0] - 199.0).abs() < 0.01);
    let both = parted[0].volume + parted[1].volume;
    assert!(both < core && both > 0.95 * core, "{both} {core}");
}

/// Slots and bores in a core of known faces: what is left is the thickness less what is taken.
#[test]
fn cut_outs_say_what_wood_is_left() {
    let foil = foil(["NACA 0012"; 2], [200.0; 2], 0.0, 0.0, TrailingEdge::Published);
    let shape = foil.shape_at(100.0).expect("a shape");
    let laminate = laminate(vec![plain(0.4)]);
    let core = Core::of(&shape, &laminate).expect("a core");
    // At the thickest place the faces are level, 24.007 mm less two skins of 0.5 mm apart.
    let (at, thick) = (0.299_828, 0.120_034_5 * 200.0 - 1.0);
    let slot = |depth, from| CutOut::Slot { from, at, width: 4.0, depth }.of(&core);
    for from in [Side::Upper, Side::Lower] {
        let cut = slot(9.0, from);
        assert!((cut.wood_left - (thick - 9.0)).abs() < 0.02, "{} {}", cut.wood_left, thick - 9.0);
        let bounds = cut.outline.bounds();
        assert!((bounds.width() - 4.0).abs() < 1e-3 && (bounds.height() - 10.0).abs() < 1e-3);
        assert!(cut.outline.area() > 0.0);
    }
    assert!(slot(40.0, Side::Upper).wood_left < 0.0);
    let bore = CutOut::Bore { at, height: 0.5, diameter: 10.0 }.of(&core);
    assert!((bore.wood_left - (0.5 * thick - 5.0)).abs() < 0.02, "{}", bore.wood_left);
    assert!((bore.outline.area() - std::f64::consts::PI * 25.0).abs() < 1e-9);
    let low = CutOut::Bore { at, height: 0.25, diameter: 10.0 }.of(&core);
    assert!((low.wood_left - (0.25 * thick - 5.0)).abs() < 0.02);
    assert!(CutOut::Bore { at, height: 0.1, diameter: 10.0 }.of(&core).wood_left < 0.0);
}

/// A hinge line by fraction, by length from the nose and by length from the trailing edge, tapering.
#[test]
fn a_hinge_line_runs_evenly_between_its_ends() {
    let line = |by, places| HingeLine { by, places, from: 40.0, to: 240.0 };
    for (line, at, chord, x) in [
        (line(HingeBy::Fraction, [0.7, 0.8]), 140.0, 100.0, 75.0),
        (line(HingeBy::Fraction, [0.7, 0.7]), 240.0, 80.0, 56.0),
        (line(HingeBy::FromNose, [90.0, 50.0]), 90.0, 120.0, 80.0),
        (line(HingeBy::FromTrailingEdge, [36.0, 24.0]), 40.0, 120.0, 84.0),
        (line(HingeBy::FromTrailingEdge, [36.0, 24.0]), 190.0, 100.0, 73.0),
    ] {
        assert!((line.x_at(at, chord) - x).abs() < 1e-9, "{line:?}");
        assert!(line.reaches(at) && !line.reaches(39.0) && !line.reaches(241.0));
    }
}

/// Pockets and holes: their area against what is left of the section, their least wood against the faces.
#[test]
fn pockets_and_holes_take_what_they_say() {
    let foil = foil(["NACA 0012"; 2], [200.0; 2], 0.0, 0.0, TrailingEdge::Published);
    let shape = foil.shape_at(100.0).expect("a shape");
    let laminate = laminate(vec![plain(0.4)]);
    let core = Core::of(&shape, &laminate).expect("a core");
    let wood = follow_with_arcs(&core, 0.002).expect("a contour").flattened(0.002);
    // At 30 % of chord the faces are level, 24.007 mm less two skins of 0.5 mm apart.
    let thick = 0.120_034_5 * 200.0 - 1.0;
    for from in [Side::Upper, Side::Lower] {
        let cut = CutOut::Pocket { from, chord: [0.25, 0.35], depth: 2.0 }.of(&core);
        assert!(cut.outline.area() > 0.0 && cut.outline.refuse_crossings(0.01).is_ok());
        // A strip of 20 mm, 2 mm deep, along a face that is all but straight there.
        assert!((cut.taken_from(&wood) - 40.0).abs() < 0.2, "{}", cut.taken_from(&wood));
        // The floor lies nearest to the other face at an end of the pocket.
        let ends = [0.25, 0.35].map(|x| 2.0 * shape.jet(shape.roots_at(200.0 * x)[0]).point.y - 1.0);
        let least = ends[0].min(ends[1]) - 2.0;
        assert!((cut.wood_left - least).abs() < 0.05, "{} {least}", cut.wood_left);
        let deepest = CutOut::Pocket { from, chord: [0.25, 0.35], depth: 30.0 };
        assert!(deepest.of(&core).wood_left < 0.0);
        let works = deepest.largest(&core, 3.0).expect("a depth");
        assert!((works - (ends[0].min(ends[1]) - 3.0)).abs() < 0.05, "{works}");
    }
    let bore = CutOut::Bore { at: 0.3, height: 0.5, diameter: 10.0 };
    assert!((bore.of(&core).taken_from(&wood) - std::f64::consts::PI * 25.0).abs() < 0.05);
    let works =
        CutOut::Bore { at: 0.3, height: 0.5, diameter: 30.0 }.largest(&core, 4.0).expect("a diameter");
    assert!((works - (thick - 8.0)).abs() < 0.02, "{works}");
    let slot = CutOut::Slot { from: Side::Upper, at: 0.3, width: 6.0, depth: 5.0 }.of(&core);
    assert!((slot.taken_from(&wood) - 30.0).abs() < 0.1, "{}", slot.taken_from(&wood));
    let hole = CutOut::Hole { at: 0.3, width: 8.0 };
    let cut = hole.of(&core);
    assert!((cut.taken_from(&wood) - 8.0 * thick).abs() < 0.2, "{}", cut.taken_from(&wood));
    assert!((cut.wood_left - (60.0 - 4.0 - 0.5)).abs() < 0.01, "{}", cut.wood_left);
    assert_eq!(hole.largest(&core, 3.0), None);
    // Two cut-outs keep apart by what lies between them, and by nothing where they run into each other.
    let near = CutOut::Bore { at: 0.35, height: 0.5, diameter: 4.0 }.of(&core);
    let gap = near.distance(&bore.of(&core).outline.flattened(0.001));
    assert!((gap - (10.0 - 5.0 - 2.0)).abs() < 0.01, "{gap}");
    assert!(
        near.distance(&wood) > 0.0
            && hole.of(&core).distance(&bore.of(&core).outline.flattened(0.001)) == 0.0
    );
}

/// What is cut out comes off the volume of the piece that it lies in: a slot of constant depth its area by
/// its length, a hole its circle by the wood's height.
#[test]
fn cut_outs_come_off_the_volumes() {
    let foil = foil(["NACA 0012"; 2], [150.0; 2], 0.0, 0.0, TrailingEdge::Published);
    let laminate = laminate(vec![plain(0.4)]);
    let hinge_at = |_: f64, chord: f64| {
        Some(Hinge { at: 0.7 * chord, ..hinge(HingeKind::Laminate { side: Side::Upper }) })
    };
    let slot = |at: f64| {
        if (50.0..=150.0).contains(&at) {
            vec![CutOut::Slot { from: Side::Lower, at: 0.3, width: 6.0, depth: 4.0 }]
        } else {
            Vec::new()
        }
    };
    let none = |_: f64| Vec::new();
    let plan = |cuts_at| WoodPlan {
        wing: &foil,
        joints: &[0.0, 50.0, 150.0, 300.0],
        laminate: &laminate,
        hinge_at: &hinge_at,
        parted: Some([100.0, 250.0]),
        flap: Some([100.5, 249.5]),
        cuts_at,
        tolerance: 0.002,
    };
    let (plain, slotted) = (plan(&none).pieces().expect("pieces"), plan(&slot).pieces().expect("pieces"));
    let taken = plain[0].volume - slotted[0].volume;
    // The face is all but level at 30 % of chord.
    assert!((taken - 6.0 * 4.0 * 100.0).abs() < 10.0, "{taken}");
    assert!((plain[1].volume - slotted[1].volume).abs() < 1e-6);
}

/// What is wrong with a part is said with its place and with a value that would work.
#[test]
fn messages_name_what_would_work() {
    let foil = foil(["NACA 2412"; 2], [120.0; 2], 0.0, 0.0, TrailingEdge::Published);
    let shape = foil.shape_at(100.0).expect("a shape");
    let thin = laminate(vec![plain(0.5)]);
    let core = Core::of(&shape, &thin).expect("a core");
    let behind = Hinge { at: 119.0, ..hinge(HingeKind::Laminate { side: Side::Upper }) };
    let Err(PartError::OffTheWood { works: Some(works), .. }) = split(&core, &behind, 0.01) else {
        panic!("a hinge behind the wood")
    };
    assert!(works < 119.0 && split(&core, &Hinge { at: works, ..behind }, 0.01).is_ok());
    let said = split(&core, &behind, 0.01).expect_err("no split").to_string();
    assert!(said.contains("at 100.0 mm from the root") && said.contains("would do"), "{said}");

    let thick = laminate(vec![plain(8.0)]);
    let error = Core::of(&shape, &thick).expect_err("no core");
    let PartError::NoCore { thickest, skins, .. } = error else { panic!("{error}") };
    assert!((thickest - 14.4).abs() < 0.02 && (skins - 16.2).abs() < 1e-9, "{error}");
    // Skins that together take less than the section is thick leave some.
    assert!(Core::of(&shape, &laminate(vec![plain(0.4 * thickest)])).is_ok());
}

/// A travel that would collide is found by turning, with the most that would not.
#[test]
fn travel_that_collides_is_told() {
    let foil = foil(["NACA 2412"; 2], [120.0; 2], 0.0, 0.0, TrailingEdge::Published);
    let shape = foil.shape_at(100.0).expect("a shape");
    let laminate = laminate(vec![plain(0.5)]);
    let core = Core::of(&shape, &laminate).expect("a core");
    let made_for = hinge(HingeKind::Laminate { side: Side::Upper });
    let parts = split(&core, &made_for, 0.005).expect("a split");
    assert!(
        (parts.free_travel[0] - made_for.up).abs() < 1e-9
            && (parts.free_travel[1] - made_for.down).abs() < 1e-9
    );
    assert!(
        (parts.gap_at_full[1] - parts.least_gap).abs() < 1e-9 && parts.gap_at_full[0] > parts.gap_at_rest
    );
    // The same wedge turned further than it was cut for.
    let further = Hinge { down: 30.0_f64.to_radians(), ..made_for };
    let axis = parts.axis;
    let parts = parts.turned_about(axis, &further);
    assert!(parts.least_gap < 0.1, "{}", parts.least_gap);
    assert!((parts.free_travel[1].to_degrees() - 15.0).abs() < 1.3, "{}", parts.free_travel[1].to_degrees());
    // About an axis that lies elsewhere, as where a bent hinge line passes, the gap is another.
    let bent = parts.turned_about(axis + Vec2::new(0.0, 0.4), &made_for);
    assert!(bent.least_gap < 0.49 && bent.least_gap > 0.3, "{}", bent.least_gap);
}
