//! Strength against closed forms, a finite-difference beam and worked examples.
//!
//! The values stand in `tests/reference/structure.toml`, with their sources. Run with `--nocapture` to
//! see what was measured against what.

// Printing what was measured is part of the purpose here.
#![allow(clippy::print_stdout)]

#[path = "common/air.rs"]
mod air;

use air::air;
use plankform::geometry::Point;
use plankform::section::{Section, Side, TrailingEdge};
use plankform::strength::material::demo;
use plankform::strength::{
    BeamStation, Cantilever, Cell, CoreElastic, Criteria, Criterion, FlapCut, Layer, Layup, LineLoad,
    LoadCase, Member, MemberStation, Mode, PlyElastic, PlyMode, PointLoad, Provenance, SectionBuild,
    SectionStiffness, SkinPly, SkinSides, StrengthError, WRINKLING_BY_THEORY, WRINKLING_FOR_DESIGN,
    crushing_reserve, wrinkling_stress,
};
use proptest::prelude::*;
use std::f64::consts::{FRAC_PI_2, FRAC_PI_4, PI, TAU};

fn reference() -> toml::Table {
    include_str!("reference/structure.toml").parse().expect("a table")
}

fn number(value: &toml::Value) -> f64 {
    value.as_float().or_else(|| value.as_integer().map(|i| i as f64)).expect("a number")
}

fn case_of(table: &toml::Table, name: &str) -> toml::Value {
    let cases = table["bredt_batho"]["case"].as_array().expect("cases");
    cases.iter().find(|case| case["name"].as_str() == Some(name)).expect("the case").clone()
}

/// Prints a figure beside its reference and holds the relative difference.
fn close(what: &str, found: f64, expected: f64, within: f64) {
    let off = (found - expected).abs() / expected.abs();
    println!("{what}: {found:.9e}, reference {expected:.9e}, off by {off:.1e}");
    assert!(off <= within, "{what}: {found} against {expected}, off by {off:e}");
}

/// A metal-like sheet, to compare with formulas for one material.
fn sheet(modulus: f64, contraction: f64) -> PlyElastic {
    PlyElastic::isotropic("sheet", Provenance::Tested, [modulus, contraction], [300.0, 300.0, 170.0], 2700.0)
}

fn layer(material: PlyElastic, angle: f64, thickness: f64) -> Layer {
    Layer { material, angle, thickness }
}

/// A core of one material, and a skin that adds next to nothing.
fn solid(modulus: f64) -> CoreElastic {
    CoreElastic { along_span: modulus, across: modulus, g: modulus / 2.6, ..air() }
}

fn build(outline: Vec<Point>, plies: Vec<SkinPly>, core: CoreElastic) -> SectionBuild {
    let nose = outline.iter().map(|p| p.x).fold(f64::INFINITY, f64::min);
    let tail = outline.iter().map(|p| p.x).fold(f64::NEG_INFINITY, f64::max);
    SectionBuild { outline, nose, chord: tail - nose, plies, core, cut_outs: Vec::new(), flap: None }
}

fn tube(outline: Vec<Point>, wall: f64, modulus: f64) -> SectionStiffness {
    let plies = vec![SkinPly::all_round(layer(sheet(modulus, 0.3), 0.0, wall))];
    SectionStiffness::of(&build(outline, plies, air()), 0.0).expect("a section")
}

fn rectangle(width: f64, height: f64) -> Vec<Point> {
    let (x, y) = (0.5 * width, 0.5 * height);
    [(-x, -y), (x, -y), (x, y), (-x, y)].map(|(x, y)| Point::new(x, y)).to_vec()
}

/// The outer face of a wall round the ellipse of its middle line.
fn ellipse_outside(a: f64, b: f64, wall: f64, count: usize) -> Vec<Point> {
    (0..count)
        .map(|i| {
            let (s, c) = (TAU * i as f64 / count as f64).sin_cos();
            let normal = (c / a).hypot(s / b);
            Point::new(a * c + 0.5 * wall * c / (a * normal), b * s + 0.5 * wall * s / (b * normal))
        })
        .collect()
}

fn foil(designation: &str, chord: f64, count: usize) -> Vec<Point> {
    let section = Section::from_designation(designation, TrailingEdge::Published).expect("a section");
    section.points(count).into_iter().map(|p| Point::new(p.x * chord, p.y * chord)).collect()
}

// Laminate theory.

/// Quasi-isotropic laminates of [0/±45/90] and [0/±60]: closed forms by Tsai and Pagano's invariants, U1 = (3 Q11 + 3 Q22 + 2 Q12 + 4 Q66)/8, U4 = (Q11 + Q22 + 6 Q12 - 4 Q66)/8: A11/t = U1,
/// A12/t = U4, A66/t = (U1 - U4)/2. Jones, "Mechanics of Composite Materials" (1975), section 2.7, from memory.
#[test]
fn quasi_isotropic_laminates_have_the_invariants() {
    let ply = demo::unidirectional_carbon();
    let share = 1.0 - ply.nu12 * ply.nu12 * ply.e2 / ply.e1;
    let (q11, q22, q12, q66) = (ply.e1 / share, ply.e2 / share, ply.nu12 * ply.e2 / share, ply.g12);
    let (u1, u4) =
        ((3.0 * q11 + 3.0 * q22 + 2.0 * q12 + 4.0 * q66) / 8.0, (q11 + q22 + 6.0 * q12 - 4.0 * q66) / 8.0);
    for angles in [&[0.0, 45.0, -45.0, 90.0][..], &[0.0, 60.0, -60.0][..]] {
        let layers = angles.iter().map(|angle: &f64| layer(ply.clone(), angle.to_radians(), 0.2)).collect();
        let skin = Layup::new(layers).expect("a skin");
        let [a, ..] = skin.abd();
        let thickness = skin.thickness();
        close("A11", a[(0, 0)] / thickness, u1, 1e-12);
        close("A22", a[(1, 1)] / thickness, u1, 1e-12);
        close("A12", a[(0, 1)] / thickness, u4, 1e-12);
        close("A66", a[(2, 2)] / thickness, 0.5 * (u1 - u4), 1e-12);
        let constants = skin.constants();
        close("E", constants.ex, (u1 * u1 - u4 * u4) / u1, 1e-12);
        close("ν", constants.nuxy, u4 / u1, 1e-12);
        close("G", constants.gxy, constants.ex / (2.0 * (1.0 + constants.nuxy)), 1e-12);
    }
}

/// Off-axis constants of a ply: 1/Ex = c⁴/E1 + (1/G12 - 2ν12/E1) s²c² + s⁴/E2 and the like; Jones 1975,
/// eq. 2.97, from memory.
#[test]
fn a_turned_ply_has_the_moduli_of_the_closed_form() {
    let ply = demo::unidirectional_carbon();
    for degrees in [0.0_f64, 10.0, 30.0, 45.0, 77.0, 90.0, -30.0] {
        let (s, c) = degrees.to_radians().sin_cos();
        let mixed = 1.0 / ply.g12 - 2.0 * ply.nu12 / ply.e1;
        let ex = 1.0 / (c.powi(4) / ply.e1 + mixed * (s * c).powi(2) + s.powi(4) / ply.e2);
        let gxy = 1.0
            / (2.0
                * (2.0 / ply.e1 + 2.0 / ply.e2 + 4.0 * ply.nu12 / ply.e1 - 1.0 / ply.g12)
                * (s * c).powi(2)
                + (s.powi(4) + c.powi(4)) / ply.g12);
        let skin = Layup::new(vec![layer(ply.clone(), degrees.to_radians(), 0.3)]).expect("a skin");
        close(&format!("Ex at {degrees}°"), skin.constants().ex, ex, 1e-12);
        close(&format!("Gxy at {degrees}°"), skin.constants().gxy, gxy, 1e-12);
    }
}

/// A 0/90 pair: A11 = A22 = (Q11 + Q22) t/2, B11 = -B22 = (Q22 - Q11) t²/8; ±45: A66/t = (Q11 + Q22 - 2 Q12)/4.
/// Closed forms of Jones 1975, sections 4.3 and 4.4, from memory.
#[test]
fn cross_and_angle_plies_have_their_closed_forms() {
    let ply = demo::unidirectional_carbon();
    let share = 1.0 - ply.nu12 * ply.nu12 * ply.e2 / ply.e1;
    let (q11, q22, q12) = (ply.e1 / share, ply.e2 / share, ply.nu12 * ply.e2 / share);
    let two = |angles: [f64; 2]| {
        Layup::new(angles.map(|angle| layer(ply.clone(), angle, 0.25)).to_vec()).expect("a skin")
    };
    let (cross, total) = (two([0.0, FRAC_PI_2]), 0.5_f64);
    let [a, b, d] = cross.abd();
    close("A11 of 0/90", a[(0, 0)], 0.5 * (q11 + q22) * total, 1e-12);
    close("B11 of 0/90", b[(0, 0)], (q22 - q11) * total.powi(2) / 8.0, 1e-12);
    close("B22 of 0/90", b[(1, 1)], (q11 - q22) * total.powi(2) / 8.0, 1e-12);
    close("D11 of 0/90", d[(0, 0)], (q11 + q22) * total.powi(3) / 24.0, 1e-12);
    let angle = two([FRAC_PI_4, -FRAC_PI_4]);
    let [a, ..] = angle.abd();
    close("A66 of ±45", a[(2, 2)] / total, 0.25 * (q11 + q22 - 2.0 * q12), 1e-12);
    assert!(a[(0, 2)].abs() < 1e-9 * a[(0, 0)], "stretch does not shear ±45");
    // A symmetric stack does not curl.
    let layers = [0.0, 0.7, 0.7, 0.0].map(|angle| layer(ply.clone(), angle, 0.1)).to_vec();
    let [a, b, _] = Layup::new(layers).expect("a skin").abd();
    assert!(b.amax() < 1e-12 * a.amax(), "B of a symmetric stack: {b}");
}

/// Off-axis strength of one ply: the maximum stress min(X/c², Y/s², S/sc) and Tsai-Hill's
/// 1/σ² = c⁴/X² + (1/S² - 1/X²) s²c² + s⁴/Y²; Jones 1975, section 2.9, from memory.
#[test]
fn the_first_ply_fails_as_off_axis_formulas_say() {
    let ply = demo::unidirectional_carbon();
    for degrees in [0.0_f64, 2.0, 15.0, 30.0, 60.0, 90.0] {
        let (s, c) = degrees.to_radians().sin_cos();
        let skin = Layup::new(vec![layer(ply.clone(), degrees.to_radians(), 0.4)]).expect("a skin");
        for (i, [x, y]) in
            [[ply.tension_along, ply.tension_across], [ply.compression_along, ply.compression_across]]
                .into_iter()
                .enumerate()
        {
            let most = (x / (c * c)).min(y / (s * s)).min(ply.shear / (s * c).abs());
            let hill = 1.0
                / (c.powi(4) / (x * x)
                    + (1.0 / ply.shear.powi(2) - 1.0 / (x * x)) * (s * c).powi(2)
                    + s.powi(4) / (y * y))
                    .sqrt();
            close("maximum stress", skin.strengths_along(Criterion::MaximumStress)[i], most, 1e-9);
            close("Tsai-Hill", skin.strengths_along(Criterion::TsaiHill)[i], hill, 1e-9);
        }
    }
    // In a 0/90 laminate the first ply to crack under tension is the one across.
    let layers = [0.0, FRAC_PI_2].map(|angle| layer(ply.clone(), angle, 0.2)).to_vec();
    let first = Layup::new(layers).expect("a skin").first_ply([10.0, 0.0, 0.0], Criterion::MaximumStress);
    assert_eq!((first.ply, first.mode), (1, PlyMode::TensionAcross));
    let skin = Layup::new(vec![layer(ply.clone(), 0.0, 0.2)]).expect("a skin");
    close("shear strength", skin.shear_strength(Criterion::TsaiHill), ply.shear, 1e-12);
    close(
        "strain in compression",
        skin.strains_along(Criterion::TsaiHill)[1],
        ply.compression_along / ply.e1,
        1e-12,
    );
}

// Sections.

/// Bredt (1896) and Batho (1915), thin tubes of `structure.toml`.
#[test]
fn thin_tubes_twist_as_bredt_and_batho_say() {
    let table = reference();
    let (modulus, g) = (26_000.0, 10_000.0);
    let round = case_of(&table, "circular tube");
    let circle = ellipse_outside(24.5, 24.5, 1.0, 2000);
    let section = tube(circle, 1.0, modulus);
    assert_eq!(section.cell, Cell::Closed);
    close("round tube, area", section.cell_area, number(&round["A_m"]) * 1e6, 1e-5);
    close("round tube, J", section.torsion / g, number(&round["J"]) * 1e12, 1e-5);
    let thin = section.torsion / g / (number(&round["J_exact"]) * 1e12) - 1.0;
    close("round tube, thin against exact", thin, number(&round["relative_error_of_thin_formula"]), 0.02);

    let flat = case_of(&table, "rectangular tube");
    let section = tube(rectangle(100.0, 40.0), 2.0, modulus);
    close("rectangular tube, area", section.cell_area, number(&flat["A_m"]) * 1e6, 1e-9);
    close("rectangular tube, J", section.torsion / g, number(&flat["J"]) * 1e12, 1e-9);

    let oval = case_of(&table, "elliptical tube");
    let section = tube(ellipse_outside(50.0, 10.0, 1.0, 4000), 1.0, modulus);
    close("elliptical tube, area", section.cell_area, number(&oval["A_m"]) * 1e6, 1e-5);
    close("elliptical tube, J", section.torsion / g, number(&oval["J"]) * 1e12, 1e-5);

    let two = case_of(&table, "two walls");
    let plies = vec![
        SkinPly::all_round(layer(sheet(modulus, 0.3), 0.0, 1.0)),
        SkinPly { chord: 0.0..=0.0, ..SkinPly::all_round(layer(sheet(modulus, 0.3), 0.0, 2.0)) },
        SkinPly { chord: 1.0..=1.0, ..SkinPly::all_round(layer(sheet(modulus, 0.3), 0.0, 2.0)) },
    ];
    let section = SectionStiffness::of(&build(rectangle(103.0, 21.0), plies, air()), 0.0).expect("a section");
    close("two walls, area", section.cell_area, number(&two["A_m"]) * 1e6, 1e-9);
    close("two walls, J", section.torsion / g, number(&two["J"]) * 1e12, 1e-9);
}

/// Second moments of `structure.toml`: rectangle, rectangular tube, hollow ellipse, solid NACA sections.
#[test]
fn second_moments_are_those_of_closed_forms() {
    let table = reference();
    let second = |key: &str| number(&table["second_moment"][key]);
    let modulus = 1000.0;
    let of = |outline: Vec<Point>| {
        let thin = SkinPly::all_round(layer(sheet(1e-6, 0.3), 0.0, 1e-6));
        SectionStiffness::of(&build(outline, vec![thin], solid(modulus)), 0.0).expect("a section")
    };
    let bar = of(rectangle(100.0, 12.0));
    close("rectangle", bar.bending_across / modulus, second("rectangle_b0p1_h0p012") * 1e12, 1e-6);
    close("rectangle, other way", bar.bending_along / modulus, 12.0 * 100.0_f64.powi(3) / 12.0, 1e-6);
    let box_section = tube(rectangle(100.0, 40.0), 2.0, modulus);
    let expected = second("rectangle_tube_0p1x0p04_wall_0p002") * 1e12;
    close("rectangular tube", box_section.bending_across / modulus, expected, 1e-9);
    // The reference hollow ellipse is the difference of two ellipses; a wall of even thickness is not quite
    // that, and its own integral along the middle line, t ∮ y² ds + t³/12 ∮ cos² ds, is the closed form.
    let wall = tube(ellipse_outside(49.5, 9.5, 1.0, 4000), 1.0, modulus);
    let steps = 200_000;
    let even: f64 = (0..steps)
        .map(|i| {
            let (s, c) = (TAU * (i as f64 + 0.5) / steps as f64).sin_cos();
            let (dx, dy) = (49.5 * s, 9.5 * c);
            let speed = dx.hypot(dy);
            let curvature = 49.5 * 9.5 / speed.powi(3);
            let (y, ny) = (9.5 * s, dx / speed);
            // ∫ (y + n ny)² (1 + κ n) dn over the thickness.
            (y * y + (ny * ny + 2.0 * y * ny * curvature) / 12.0) * speed * TAU / steps as f64
        })
        .sum();
    close("elliptical wall", wall.bending_across / modulus, even, 1e-5);
    let difference = second("ellipse_hollow_a0p05_b0p01_wall_0p001_Ix") * 1e12;
    println!("  (difference of two ellipses: {:+.2} %)", 100.0 * (difference / even - 1.0));
    for digits in ["0009", "0012", "0015"] {
        let chord = 120.0;
        let section = of(foil(&format!("NACA {digits}"), chord, 800));
        let key = |what: &str| second(&format!("naca_{digits}_{what}"));
        close(digits, section.core_area, key("area_over_c2") * chord.powi(2), 1e-4);
        close(digits, section.bending_across / modulus, key("Ix_over_c4") * chord.powi(4), 1e-4);
        close(digits, section.bending_along / modulus, key("Iy_centroid_over_c4") * chord.powi(4), 1e-4);
        close(digits, section.centroid.x, key("centroid_x_over_c") * chord, 1e-4);
        assert!(section.principal_angle.abs() < 1e-6, "a symmetric section has its axes along x and y");
    }
}

/// A turned rectangle: principal stiffnesses b h³/12 both ways and the angle that it was turned by.
#[test]
fn principal_axes_follow_a_turned_bar() {
    let turn = 0.3_f64;
    let (s, c) = turn.sin_cos();
    let outline = rectangle(100.0, 12.0)
        .into_iter()
        .map(|p| Point::new(c * p.x - s * p.y, s * p.x + c * p.y))
        .collect();
    let thin = SkinPly::all_round(layer(sheet(1e-6, 0.3), 0.0, 1e-6));
    let section = SectionStiffness::of(&build(outline, vec![thin], solid(1000.0)), 0.0).expect("a section");
    close("greatest", section.principal[0], 1e3 * 12.0 * 1e6 / 12.0, 1e-6);
    close("least", section.principal[1], 1e3 * 100.0 * 1728.0 / 12.0, 1e-6);
    close("angle", section.principal_angle, turn, 1e-6);
    // A moment about the weak axis bends it the most: curvature times stiffness gives the moment back.
    let [across, along] = section.curvatures([5000.0, 300.0]);
    close("moment", section.bending_across * across + section.bending_product * along, 5000.0, 1e-9);
    close("moment", section.bending_product * across + section.bending_along * along, 300.0, 1e-9);
}

/// Skins and core share what there is: the areas of walls and core add up to the outline's, to the last
/// place where the skins have merged at a thin trailing edge.
#[test]
fn skins_and_core_fill_the_outline() {
    for designation in ["NACA 0012", "NACA 4412", "NACA 63-012"] {
        let Ok(section) = Section::from_designation(designation, TrailingEdge::Published) else { continue };
        let outline: Vec<Point> =
            section.points(200).into_iter().map(|p| Point::new(p.x * 90.0, p.y * 90.0)).collect();
        let area = plankform::geometry::polygon::area(&outline).abs();
        for wall in [0.3, 0.8, 1.5] {
            let ply = SkinPly::all_round(layer(demo::woven_glass(), 0.0, wall));
            let plain = SectionStiffness::of(&build(outline.clone(), vec![ply], demo::foam()), 0.0)
                .expect("a section");
            let walls: f64 = plain.walls().walls.iter().map(plankform::strength::Wall::area).sum();
            close(&format!("{designation}, {wall} mm"), walls + plain.core_area, area, 1e-9);
            let weight = 1e-6 * (walls * 1780.0 + plain.core_area * 80.0);
            close("weight", plain.mass, weight, 1e-9);
        }
    }
}

/// Sandwich beam: D of Allen, "Analysis and Design of Structural Sandwich Panels" (1969), chapter 2, the core
/// shear V/(b d), and the tip's deflection P L³/3D + P L/S of the example in `structure.toml`.
#[test]
fn a_sandwich_beam_bends_and_shears_as_allen_says() {
    let table = reference();
    let example = &table["sandwich"]["example"][0];
    let get = |key: &str| number(&example[key]);
    let core = CoreElastic { along_span: get("E_c") * 1e-6, g: get("G_c") * 1e-6, ..demo::foam() };
    // Faces end at the sides, which stay bare: the ply covers the chord but for its very ends.
    let face = SkinPly {
        chord: 1e-6..=1.0 - 1e-6,
        ..SkinPly::all_round(layer(sheet(get("E_f") * 1e-6, 0.3), 0.0, 0.8))
    };
    let section =
        SectionStiffness::of(&build(rectangle(100.0, 11.6), vec![face], core), 0.0).expect("a section");
    assert_eq!(section.cell, Cell::Open);
    close("D", section.bending_across, get("D") * 1e6, 1e-4);
    let core_shear = section.core_shear() * get("P");
    close("core shear, thin faces", core_shear, get("core_shear_thin") * 1e-6, 0.01);
    let strain =
        section.strain(Point::new(0.0, 5.8), section.curvatures([get("P") * get("L") * 1e3, 0.0]), 0.0);
    close("face stress", -strain * get("E_f") * 1e-6, get("face_stress_outer_exact") * 1e-6, 1e-4);

    let station =
        |at: f64| BeamStation { shear: Some(get("S")), ..BeamStation::plain(at, get("D") * 1e6, 1e9) };
    let beam = Cantilever::new(vec![station(0.0), station(get("L") * 1e3)]).expect("a beam");
    let tip = LoadCase {
        points: vec![PointLoad { at: get("L") * 1e3, force: [get("P"), 0.0], ..PointLoad::default() }],
        ..LoadCase::new("tip", 1.0)
    };
    let result = beam.under(&tip).expect("a result");
    // The reference is printed to ten decimals of a metre.
    close("deflection", result.tip().deflection[0], get("deflection") * 1e3, 4e-9);
}

/// Shear centres: of a thin channel e = 3 b²/(h + 6 b) behind its web (Timoshenko, "Strength of Materials",
/// part 1, 1955, from memory), of a closed doubly symmetric tube its middle, and the flows balance the force.
#[test]
fn shear_centres_are_where_the_handbooks_have_them() {
    // A channel that opens to the rear: web at the nose, flanges above and below, the aft face bare.
    let (b, h, wall) = (50.0, 40.0, 0.05);
    let outline =
        [(0.0, -20.0), (50.0, -20.0), (50.0, 20.0), (0.0, 20.0)].map(|(x, y)| Point::new(x, y)).to_vec();
    let ply = SkinPly { chord: 0.0..=0.999_999, ..SkinPly::all_round(layer(sheet(1e4, 0.3), 0.0, wall)) };
    let channel = SectionStiffness::of(&build(outline, vec![ply], air()), 0.0).expect("a section");
    assert_eq!(channel.cell, Cell::Open);
    close("channel, ahead of its web", -channel.shear_centre.x, 3.0 * b * b / (h + 6.0 * b), 2e-3);

    let tube = tube(rectangle(100.0, 40.0), 0.5, 1e4);
    assert!(tube.shear_centre.to_vec2().hypot() < 1e-6, "{:?}", tube.shear_centre);
    let mut force = [[0.0; 2]; 2];
    for (i, wall) in tube.walls().walls.iter().enumerate() {
        let [from, to] = wall.middle_line();
        for (direction, flow) in tube.wall_flow(i).into_iter().enumerate() {
            force[direction][0] += flow * (to.y - from.y);
            force[direction][1] += flow * (to.x - from.x);
        }
    }
    println!("resultants of the flows: {force:?}");
    assert!((force[0][0] - 1.0).abs() < 1e-9 && force[0][1].abs() < 1e-9, "across: {force:?}");
    assert!((force[1][1] - 1.0).abs() < 1e-9 && force[1][0].abs() < 1e-9, "along: {force:?}");
}

/// Cutting the flap off leaves a cell that closes at a web, or an open one that hardly resists torsion; the
/// closed one of a rectangle is Bredt's for what is left.
#[test]
fn a_parted_flap_opens_the_cell_or_closes_it_at_a_web() {
    let ply = SkinPly::all_round(layer(sheet(26_000.0, 0.3), 0.0, 1.0));
    let whole = build(rectangle(100.0, 20.0), vec![ply.clone()], air());
    let web = |web: Vec<Layer>| FlapCut { at: 70.0, web };
    let closed = SectionBuild { flap: Some(web(vec![ply.layer.clone()])), ..whole.clone() };
    let closed = SectionStiffness::of(&closed, 0.0).expect("a section");
    let (width, height) = (69.0, 19.0);
    let bredt = 4.0 * (width * height) * (width * height) / (2.0 * (width + height));
    close("closed at a web", closed.torsion / 1e4, bredt, 1e-9);
    let open = SectionBuild { flap: Some(web(Vec::new())), ..whole };
    let open = SectionStiffness::of(&open, 0.0).expect("a section");
    assert_eq!((closed.cell, open.cell), (Cell::Closed, Cell::Open));
    close("open, Σ l t³/3", open.torsion / 1e4, (2.0 * 69.5 + 19.0) / 3.0, 0.01);
}

/// Saint-Venant's approximation for the core against the exact ellipse and the rectangles of
/// `structure.toml`: how far off it is, is stated in the docs.
#[test]
fn the_core_twists_nearly_as_exact_solutions_say() {
    let table = reference();
    let thin = SkinPly::all_round(layer(sheet(1e-9, 0.3), 0.0, 1e-9));
    let core = CoreElastic { g: 1000.0, ..solid(2600.0) };
    let of = |outline: Vec<Point>| {
        let build = build(outline, vec![thin.clone()], core.clone());
        SectionStiffness::of(&build, 0.0).expect("a section").torsion / 1000.0
    };
    let exact = number(&table["solid_torsion"]["ellipse_a0p05_b0p006_J"]) * 1e12;
    close("ellipse", of(ellipse_outside(50.0, 6.0, 0.0, 2000)), exact, 0.015);
    let ratios = table["solid_torsion"]["rectangle_ratio"].as_array().expect("ratios");
    let values = table["solid_torsion"]["rectangle_J_over_ab3"].as_array().expect("values");
    for (ratio, value) in ratios.iter().zip(values) {
        let ratio = number(ratio);
        close(
            &format!("rectangle {ratio}:1"),
            of(rectangle(10.0 * ratio, 10.0)),
            number(value) * ratio * 1e4,
            0.07,
        );
    }
}

// Beams.

fn uniform(reach: f64, bending: f64) -> Cantilever {
    let stations = [0.0, reach].map(|at| BeamStation::plain(at, bending, 2.0 * bending));
    Cantilever::new(stations.to_vec()).expect("a beam")
}

fn row(name: &str, samples: impl IntoIterator<Item = (f64, f64)>) -> LoadCase {
    let load = |(at, force)| LineLoad { at, force: [force, 0.0], torque: 0.0 };
    LoadCase { spread: vec![samples.into_iter().map(load).collect()], ..LoadCase::new(name, 1.0) }
}

/// Closed forms of the cantilever in `structure.toml` (Roark's "Formulas for Stress and Strain").
#[test]
fn cantilevers_bend_as_closed_forms_say() {
    let table = reference();
    let example = &table["cantilever"]["example"][0];
    let get = |key: &str| number(&example[key]);
    let (length, bending) = (get("L") * 1e3, get("E") * 1e-6 * get("I") * 1e12);
    let beam = uniform(length, bending);
    let tip = LoadCase {
        points: vec![PointLoad::acting_at(length, [get("P"), 0.0], [25.0, 0.0])],
        ..LoadCase::new("tip load", 1.0)
    };
    let result = beam.under(&tip).expect("a result");
    close("tip load, moment", result.root().moment[0], get("M_root") * 1e3, 1e-12);
    close("tip load, deflection", result.tip().deflection[0], get("deflection") * 1e3, 1e-9);
    close("tip load, slope", result.tip().slope[0], get("slope"), 1e-9);
    // 25 mm behind the shear centre: nose down, T L / G J.
    close("tip load, twist", result.tip().twist, -get("P") * 25.0 * length / (2.0 * bending), 1e-12);

    let (reach, stiffness, peak) = (700.0, 3e7, 2.0_f64);
    let beam = uniform(reach, stiffness);
    let elliptic = |count: usize| {
        (0..=count)
            .map(move |i| (FRAC_PI_2 * i as f64 / count as f64).sin_cos())
            .map(move |(s, c)| (reach * s, peak * c))
    };
    for (key, case, within) in [
        ("uniform", row("uniform", [(0.0, peak), (reach, peak)]), 1e-12),
        ("triangular", row("triangular", [(0.0, peak), (reach, 0.0)]), 1e-12),
        ("elliptic", row("elliptic", elliptic(400)), 1e-5),
    ] {
        let unit: Vec<f64> = table["cantilever"][&format!("{key}_M_d_slope_unit")]
            .as_array()
            .expect("three")
            .iter()
            .map(number)
            .collect();
        let result = beam.under(&case).expect("a result");
        // The reference is printed to ten decimals.
        let within = f64::max(within, 2e-9);
        close(&format!("{key}, moment"), result.root().moment[0], unit[0] * peak * reach.powi(2), within);
        let deflection = unit[1] * peak * reach.powi(4) / stiffness;
        close(&format!("{key}, deflection"), result.tip().deflection[0], deflection, within);
        close(
            &format!("{key}, slope"),
            result.tip().slope[0],
            unit[2] * peak * reach.powi(3) / stiffness,
            within,
        );
    }
    // Straight lines between samples: the error falls fourfold for each doubling.
    let error = |count: usize| {
        let exact = 0.075_952_548_2 * peak * reach.powi(4) / stiffness;
        let found = beam.under(&row("elliptic", elliptic(count))).expect("a result").tip().deflection[0];
        (found - exact).abs()
    };
    let falls = [error(10) / error(20), error(20) / error(40)];
    println!("elliptic, error falls by {falls:?}");
    assert!(falls.iter().all(|fall| *fall > 3.5), "{falls:?}");
}

/// A tapered beam under a jumping load against finite differences of (EI v'')'' = w, made apart.
#[test]
fn a_tapered_beam_agrees_with_finite_differences() {
    let reach = 600.0;
    let stations: Vec<BeamStation> = (0..=6)
        .map(|i| {
            let at = 100.0 * f64::from(i);
            let chord = 1.0 - 0.1 * f64::from(i);
            BeamStation::plain(at, 4e7 * chord.powi(4), 6e7 * chord.powi(4))
        })
        .collect();
    let beam = Cantilever::new(stations.clone()).expect("a beam");
    let load = |at: f64| if (150.0..450.0).contains(&at) { 0.8 + 0.002 * (at - 150.0) } else { 0.0 };
    let case = row("jump", [(150.0, 0.8), (450.0, 1.4)]);
    let result = beam.under(&case).expect("a result");

    // Unknown deflections at the nodes; M = EI v'' by central differences, M'' = w likewise. A cantilever lets
    // the moment be marched from the tip and the deflection from the root with these very differences.
    let tip_by_differences = |count: usize| {
        let step = reach / count as f64;
        let stiffness = |i: usize| {
            let at = i as f64 * step;
            let pair = stations.windows(2).find(|pair| at <= pair[1].at).expect("a pair");
            let share = (at - pair[0].at) / (pair[1].at - pair[0].at);
            pair[0].bending[0] + share * (pair[1].bending[0] - pair[0].bending[0])
        };
        // At a jump the node takes the mean of both sides.
        let mean = |i: usize| 0.5 * (load(i as f64 * step - 1e-6) + load(i as f64 * step + 1e-6));
        let mut moment = vec![0.0; count + 2];
        for i in (1..=count).rev() {
            moment[i - 1] = 2.0 * moment[i] - moment[i + 1] + step * step * mean(i);
        }
        let mut deflection = vec![0.0; count + 1];
        deflection[1] = 0.5 * step * step * moment[0] / stiffness(0);
        for i in 1..count {
            deflection[i + 1] =
                2.0 * deflection[i] - deflection[i - 1] + step * step * moment[i] / stiffness(i);
        }
        (moment[0], deflection[count])
    };
    let (coarse, fine) = (tip_by_differences(2400), tip_by_differences(4800));
    let order = 2.0_f64;
    let limit = fine.1 + (fine.1 - coarse.1) / (order.powi(2) - 1.0);
    close("moment by differences", result.root().moment[0], fine.0, 1e-6);
    close("deflection by differences", result.tip().deflection[0], limit, 1e-6);
}

/// Euler's column held at one end, π² EI / 4 L² (1744), and one whose stiffness falls linearly to a fifth, against
/// shooting by Runge and Kutta's rule.
#[test]
fn a_column_buckles_at_eulers_load() {
    let (reach, stiffness) = (900.0, 5e8);
    close(
        "Euler",
        uniform(reach, stiffness).buckling_load(),
        PI * PI * stiffness / (4.0 * reach * reach),
        1e-5,
    );
    let stations = vec![
        BeamStation::plain(0.0, stiffness, stiffness),
        BeamStation::plain(reach, 0.2 * stiffness, stiffness),
    ];
    let tapered = Cantilever::new(stations).expect("a beam").buckling_load();
    // v'' = -P v / EI from the tip (v = 0 there, slope 1) to a root of no slope: the least P for it.
    let root_slope = |push: f64| {
        let steps = 4000;
        let h = reach / f64::from(steps);
        let ei = |s: f64| stiffness * (0.2 + 0.8 * s / reach);
        let rate = |s: f64, [v, slope]: [f64; 2]| [slope, -push * v / ei(s)];
        let mut state = [0.0, 1.0];
        for i in 0..steps {
            let s = f64::from(i) * h;
            let add = |k: [f64; 2], by: f64| [state[0] + by * k[0], state[1] + by * k[1]];
            let k1 = rate(s, state);
            let k2 = rate(s + 0.5 * h, add(k1, 0.5 * h));
            let k3 = rate(s + 0.5 * h, add(k2, 0.5 * h));
            let k4 = rate(s + h, add(k3, h));
            state = [0, 1].map(|j| state[j] + h / 6.0 * (k1[j] + 2.0 * k2[j] + 2.0 * k3[j] + k4[j]));
        }
        state[1]
    };
    let (mut low, mut high) = (0.0, PI * PI * stiffness / (4.0 * reach * reach));
    for _ in 0..40 {
        let middle = 0.5 * (low + high);
        if root_slope(middle) > 0.0 { low = middle } else { high = middle }
    }
    close("tapered column", tapered, low, 1e-4);
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(64))]

    /// Sums at the root balance the loads, wherever these lie; twice the factor gives twice the deflection.
    #[test]
    fn forces_at_the_root_balance_the_loads(
        at in 1.0..800.0_f64, across in -500.0..500.0_f64, along in -500.0..500.0_f64,
        x in -50.0..50.0_f64, y in -20.0..20.0_f64, from in 0.0..400.0_f64, wide in 1.0..400.0_f64,
        low in -3.0..3.0_f64, high in -3.0..3.0_f64,
    ) {
        let beam = uniform(800.0, 2e7);
        let mut case = row("any", [(from, low), (from + wide, high)]);
        case.points.push(PointLoad::acting_at(at, [across, along], [x, y]));
        let root = beam.under(&case).expect("a result").root();
        let total = 0.5 * (low + high) * wide;
        let arm = from * total + wide * wide * (low + 2.0 * high) / 6.0;
        prop_assert!((root.shear[0] - across - total).abs() < 1e-8);
        prop_assert!((root.moment[0] - across * at - arm).abs() < 1e-6 * (1.0 + arm.abs() + (across * at).abs()));
        prop_assert!((root.moment[1] - along * at).abs() < 1e-8 * (1.0 + (along * at).abs()));
        prop_assert!((root.torque - along * y + across * x).abs() < 1e-8 * (1.0 + root.torque.abs()));
        let once = beam.under(&case).expect("a result").tip();
        let twice = beam.under(&LoadCase { factor: 2.0, ..case }).expect("a result").tip();
        prop_assert!((twice.deflection[0] - 2.0 * once.deflection[0]).abs() < 1e-9 * (1.0 + once.deflection[0].abs()));
    }

    /// Whatever is given, an answer is a number or an error in words.
    #[test]
    fn nothing_gives_a_value_that_is_no_number(
        wall in prop_oneof![0.0..60.0_f64, Just(f64::NAN), Just(-1.0)],
        chord in prop_oneof![1.0..300.0_f64, Just(0.0), Just(f64::INFINITY)],
        modulus in prop_oneof![1.0..2e5_f64, Just(0.0)],
        cut in -0.5..1.5_f64, is_cut in any::<bool>(), angle in -4.0..4.0_f64,
    ) {
        let ply = layer(PlyElastic { e1: modulus, ..demo::woven_glass() }, angle, wall);
        let mut section = build(foil("NACA 4412", 1.0, 60), vec![SkinPly::all_round(ply)], demo::foam());
        section.outline.iter_mut().for_each(|p| *p = Point::new(p.x * chord, p.y * chord));
        section.chord = chord;
        section.flap = is_cut.then(|| FlapCut { at: cut * chord, web: Vec::new() });
        match SectionStiffness::of(&section, 12.0) {
            Ok(found) => {
                let values = [found.bending_across, found.bending_along, found.torsion, found.mass,
                    found.shear_centre.x, found.shear_centre.y, found.core_shear(), found.principal_angle];
                prop_assert!(values.iter().all(|value| value.is_finite()), "{values:?}");
            }
            Err(error) => prop_assert!(!error.to_string().is_empty()),
        }
    }
}

// Reserves and what mends them.

/// Hoff and Mautner (1945): 0.5 ∛(Ef Ec Gc); for a face of 50 GPa on a foam of 70 and 25 MPa by hand.
#[test]
fn wrinkling_is_the_published_formula() {
    // ∛(50000 · 70 · 25) = ∛87 500 000 = 443.952…
    close("wrinkling", wrinkling_stress(WRINKLING_FOR_DESIGN, 5e4, 70.0, 25.0), 221.976, 1e-5);
    close("by theory", wrinkling_stress(WRINKLING_BY_THEORY, 5e4, 70.0, 25.0), 0.91 * 443.952, 1e-5);
}

/// A foot of 80 kg on 100 cm² of foam that stands 1.2 MPa, by hand: 1.2 · 10 000 / (80 · 9.80665).
#[test]
fn a_foot_crushes_a_core_at_its_strength() {
    close("crushing", crushing_reserve(&demo::foam(), -80.0 * 9.80665, 10_000.0), 15.2957, 1e-5);
    assert!(crushing_reserve(&demo::foam(), 0.0, 100.0) > 1e5, "nothing stands on it");
    assert!(crushing_reserve(&demo::foam(), 10.0, f64::NAN) < 1.0, "no patch, no reserve");
}

/// A closed thin skin on NACA 0012 twists by Bredt's formula with area and girth of its middle line, here
/// from the printed thickness equation (Report 460) by a fine polygon; bends by t ∮ y² ds of the same.
#[test]
fn a_foils_skin_twists_and_bends_as_its_middle_line_says() {
    let (chord, wall, modulus) = (120.0, 0.02, 26_000.0);
    let section = tube(foil("NACA 0012", chord, 800), wall, modulus);
    let half = |x: f64| {
        0.6 * (0.2969 * x.sqrt() - 0.1260 * x - 0.3516 * x.powi(2) + 0.2843 * x.powi(3) - 0.1015 * x.powi(4))
    };
    let (mut area, mut girth, mut second) = (0.0, 0.0, 0.0);
    let count = 20_000;
    for i in 0..count {
        let [x0, x1] = [i, i + 1].map(|i| (f64::from(i) / f64::from(count)).powi(2));
        let [y0, y1] = [half(x0), half(x1)].map(|y| y * chord);
        let length = ((x1 - x0) * chord).hypot(y1 - y0);
        area += (y0 + y1) * (x1 - x0) * chord;
        girth += 2.0 * length;
        // The wall's middle lies half its thickness inside, square to the surface.
        let inside = 0.5 * wall * (x1 - x0) * chord / length;
        let [y0, y1] = [y0 - inside, y1 - inside];
        second += 2.0 * wall * length * (y0 * y0 + y0 * y1 + y1 * y1) / 3.0;
    }
    let blunt = 2.0 * half(1.0) * chord;
    second += wall * blunt.powi(3) / 12.0;
    area -= 0.5 * wall * girth;
    close("GJ of a foil's skin", section.torsion / 1e4, 4.0 * area * area * wall / (girth + blunt), 5e-4);
    close("EI of a foil's skin", section.bending_across / modulus, second, 5e-4);
}

/// A box strut under a tip load: the skin's reserve is strength over M y / I, by hand.
#[test]
fn a_reserve_is_strength_over_stress() {
    let ply = SkinPly::all_round(layer(sheet(70_000.0, 0.3), 0.0, 2.0));
    let station =
        |at: f64| MemberStation { at, build: build(rectangle(100.0, 40.0), vec![ply.clone()], demo::foam()) };
    let part = Member::new(vec![station(0.0), station(250.0), station(500.0)]).expect("a part");
    let case = LoadCase {
        points: vec![PointLoad { at: 500.0, force: [1000.0, 0.0], ..PointLoad::default() }],
        ..LoadCase::new("tip", 2.0)
    };
    let criteria = Criteria { ply: Criterion::MaximumStress, wrinkling: 1e3 };
    let result = part.under(&case, criteria).expect("a result");
    let skin = result.stations[0].reserves[0];
    // The foam takes its share: E Ix of the tube and of the 96 mm x 36 mm within.
    let shared = 160_085.333_333 + 70.0 / 70_000.0 * 96.0 * 36.0_f64.powi(3) / 12.0;
    let stress = 2.0 * 1000.0 * 500.0 * 20.0 / shared;
    close("reserve of the skin", skin.reserve, 300.0 / stress, 1e-9);
    let middle = result.stations[1].reserves[0];
    close("half way", middle.reserve, 2.0 * skin.reserve, 1e-9);
    // Held against wrinkling, the same stress counts.
    let design = part.under(&case, Criteria::default()).expect("a result").stations[0].reserves[1];
    let wrinkling = wrinkling_stress(0.5, 70_000.0, 70.0, 25.0);
    close("reserve against wrinkling", design.reserve, wrinkling / stress, 1e-9);
    assert_eq!(design.mode, Mode::Wrinkling);
    assert_eq!(design.side, Side::Upper, "the side towards which the load points is pressed");
    // A push buckles it at Euler's load, 500 mm long.
    let push = LoadCase::grounding("grounding", 1.0, [50_000.0, 0.0, 0.0], 500.0, 0.0);
    let pushed = part.under(&push, criteria).expect("a result");
    let euler = PI * PI * part.sections()[0].bending_across / (4.0 * 500.0 * 500.0);
    close("buckling", pushed.buckling, euler / 50_000.0, 1e-5);
}

fn strut(plies: usize) -> Member {
    let cloth = || SkinPly::all_round(layer(demo::woven_glass(), 0.0, 0.3));
    let bias = SkinPly::all_round(layer(demo::woven_glass(), FRAC_PI_4, 0.3));
    let station = |i: i32| {
        let at = 50.0 * f64::from(i);
        let mut skins = vec![bias.clone()];
        skins.extend((0..plies).map(|_| cloth()));
        MemberStation { at, build: build(foil("NACA 0012", 110.0, 120), skins, demo::light_wood()) }
    };
    Member::new((0..=16).map(station).collect()).expect("a strut")
}

/// A strut of invented material that breaks at the hull under a side force, and the fewest plies that mend it:
/// one less fails, a shorter stretch fails, and the mended part worked out afresh holds.
#[test]
fn a_strut_that_fails_is_mended_by_the_fewest_plies() {
    let part = strut(1);
    let cases = [
        LoadCase::side_force("side force in a turn", 2.0, 300.0, [300.0, 800.0], 27.5),
        LoadCase::off_course_tow("tow off the course", 1.5, 250.0, 0.5, 800.0, [55.0, 0.0]),
        LoadCase::standing("a person standing on it, laid flat", 1.2, 30.0, 300.0, 40.0),
        LoadCase::grounding("grounding", 1.5, [400.0, 150.0, 40.0], 800.0, 30.0),
    ];
    let (criteria, asked) = (Criteria::default(), 1.5);
    let before = part.least(&cases, criteria).expect("a reserve");
    println!("before: {before:?}");
    assert!(before.reserve.reserve < 1.0, "it breaks: {before:?}");
    assert_eq!((before.at, before.case.as_str()), (0.0, "side force in a turn"), "at the hull");

    let candidate = layer(demo::unidirectional_carbon(), 0.0, 0.25);
    let cure = part.cure(&cases, criteria, &candidate, asked).expect("a cure");
    println!("cure: {} plies over {:?}, then {:?}", cure.plies, cure.span, cure.least);
    assert!(cure.plies >= 1 && cure.least.reserve.reserve >= asked);
    let again = part.with_plies(&candidate, cure.plies, &cure.span).expect("a strut");
    let after = again.least(&cases, criteria).expect("a reserve");
    close("worked out afresh", after.reserve.reserve, cure.least.reserve.reserve, 1e-12);
    let whole = 0.0..=800.0;
    let fewer = part.with_plies(&candidate, cure.plies - 1, &whole).expect("a strut");
    assert!(fewer.least(&cases, criteria).expect("a reserve").reserve.reserve < asked, "one ply less fails");
    // Two stations shorter, past the margin of one, it fails where it ends.
    assert!(*cure.span.end() < 800.0, "not needed out to the tip");
    let short = 0.0..=*cure.span.end() - 100.0;
    let shorter = part.with_plies(&candidate, cure.plies, &short).expect("a strut");
    assert!(shorter.least(&cases, criteria).expect("a reserve").reserve.reserve < asked);
    // Nothing to mend where nothing fails, and no cure of a thing that plies cannot mend.
    let fine = part.cure(&cases, criteria, &candidate, 0.1).expect("no cure needed");
    assert_eq!(fine.plies, 0);
    let hopeless = part.cure(&cases, criteria, &candidate, 1e4);
    assert!(matches!(hopeless, Err(StrengthError::NoCure { tried: 12, .. })), "{hopeless:?}");
    println!("untested: {:?}, weight {:.3} kg", part.untested(), part.mass());
    assert_eq!(part.untested().len(), 2, "both materials are marked as invented");
}

/// Skins on one side only: the section's stiff centre moves to it, and a ply on the other brings it back.
#[test]
fn a_ply_on_one_side_counts_on_that_side() {
    let one = |side| SkinPly {
        sides: SkinSides::One(side),
        ..SkinPly::all_round(layer(demo::unidirectional_carbon(), 0.0, 0.3))
    };
    let cloth = SkinPly::all_round(layer(demo::woven_glass(), 0.0, 0.3));
    let of = |plies: Vec<SkinPly>| {
        SectionStiffness::of(&build(foil("NACA 0012", 110.0, 120), plies, demo::foam()), 0.0)
            .expect("a section")
    };
    let upper = of(vec![cloth.clone(), one(Side::Upper)]);
    let both = of(vec![cloth, one(Side::Upper), one(Side::Lower)]);
    assert!(
        upper.centroid.y > 1.0 && both.centroid.y.abs() < 1e-6,
        "{:?} {:?}",
        upper.centroid,
        both.centroid
    );
}

/// Impossible input is refused in words that name it.
#[test]
fn impossible_input_is_refused_in_words() {
    let bad = PlyElastic { g12: 0.0, ..demo::woven_glass() };
    let message = Layup::new(vec![layer(bad, 0.0, 0.3)]).expect_err("an error").to_string();
    assert!(message.contains("woven glass") && message.contains("G12"), "{message}");
    let bad = PlyElastic { nu12: 1.2, ..demo::woven_glass() };
    assert!(Layup::new(vec![layer(bad, 0.0, 0.3)]).is_err());
    assert_eq!(Layup::new(Vec::new()), Err(StrengthError::Plies));
    let beam = uniform(500.0, 1e7);
    let off = row("gust", [(0.0, 1.0), (600.0, 1.0)]);
    let message = beam.under(&off).expect_err("an error").to_string();
    assert!(message.contains("gust") && message.contains("600"), "{message}");
    let none = LoadCase::new("nothing", 1.0);
    assert!(beam.under(&none).is_err());
    let flat = build(vec![Point::ORIGIN, Point::new(10.0, 0.0)], Vec::new(), demo::foam());
    assert!(matches!(SectionStiffness::of(&flat, 70.0), Err(StrengthError::Outline { .. })));
    assert!(Cantilever::new(vec![BeamStation::plain(0.0, 1.0, 1.0)]).is_err());
    let part = strut(1);
    assert_eq!(part.least(&[], Criteria::default()), Err(StrengthError::NoCases));
}
