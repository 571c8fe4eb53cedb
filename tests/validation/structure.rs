//! The whole foil as a lifting line, and its strength.

use super::air::air;
use super::page::{Part, Unit, row};
use super::{greatest, number, numbers, parsed};
use plankform::geometry::Point;
use plankform::loading::{LiftingLine, Loading, Setting, State, ThinSection};
use plankform::section::{Section, TrailingEdge};
use plankform::strength::material::demo;
use plankform::strength::{
    BeamStation, Cantilever, Layer, Layup, LineLoad, LoadCase, PlyElastic, PointLoad, Provenance,
    SectionBuild, SectionStiffness, SkinPly, WRINKLING_FOR_DESIGN, wrinkling_stress,
};
use plankform::wing::{Law, Station, Wing, along};
use std::f64::consts::{FRAC_PI_2, PI, TAU};

fn station(at: f64, chord: f64) -> Station {
    let section = Section::from_designation("NACA 0012", TrailingEdge::Closed).expect("a section");
    Station { at, chord, section, twist: 0.0, sweep: 0.0, rise: 0.0, twist_about: 0.25 }
}

fn elliptic(aspect_ratio: f64) -> Wing {
    let ends = vec![station(0.0, 4.0 * 1000.0 / (PI * aspect_ratio)), station(500.0, 1e-6)];
    Wing::new(along(Law::Elliptic, ends).expect("stations"), true).expect("a foil")
}

fn tapered(aspect_ratio: f64, taper: f64) -> Wing {
    let root = 2.0 * 1000.0 / aspect_ratio / (1.0 + taper);
    Wing::new(vec![station(0.0, root), station(500.0, taper * root)], true).expect("a foil")
}

fn loaded(wing: &Wing, setting: &Setting) -> Loading {
    let state = State { speed: 5.0, density: 1025.0, incidence: 0.05, flap: 0.0 };
    LiftingLine::new(wing, setting).expect("a line").load(&ThinSection::default(), &state).expect("a load")
}

/// Prandtl's interference factor of two elliptic loads one `gap` spans above the other, by the midpoint
/// rule over the wake of one and the load of the other.
fn biplane(gap: f64) -> f64 {
    let (count, gap) = (400, 2.0 * gap);
    let angle = |i: usize| PI * (i as f64 + 0.5) / count as f64;
    let step = PI / count as f64;
    let mut sum = 0.0;
    for i in 0..count {
        for j in 0..count {
            let (load, apart) = (angle(i).sin(), angle(j).cos() - angle(i).cos());
            sum += load * load * angle(j).cos() * apart / (apart * apart + gap * gap) * step * step;
        }
    }
    sum / (PI * FRAC_PI_2)
}

pub(crate) fn lifting_line() -> Part {
    let table = parsed(include_str!("../reference/lifting_line.toml"));
    let reference = &table["elliptic_wing"];
    let pairs = numbers(&reference["aspect_ratio"]).into_iter().zip(numbers(&reference["CL_alpha"]));
    let elliptic_slope = greatest(pairs.map(|(aspect_ratio, slope)| {
        let setting = Setting { strips: 80, ..Setting::default() };
        loaded(&elliptic(aspect_ratio), &setting).lift_coefficient / 0.05 / slope - 1.0
    }));
    let (mut slope_off, mut drag_off) = (0.0_f64, 0.0_f64);
    for entry in table["lifting_line"]["wing"].as_array().expect("rows") {
        let get = |key: &str| number(&entry[key]);
        let loading = loaded(&tapered(get("aspect_ratio"), get("taper")), &Setting::default());
        let factor = 1.0 / loading.span_efficiency().expect("induced drag");
        slope_off = slope_off.max((loading.lift_coefficient / 0.05 / get("CL_alpha_converged") - 1.0).abs());
        drag_off = drag_off.max((factor / (1.0 + get("delta_converged")) - 1.0).abs());
    }
    let depth = greatest([0.05, 0.1, 0.25, 0.5].map(|depth: f64| {
        let setting = Setting { depth: Some(1000.0 * depth), strips: 60, ..Setting::default() };
        let factor = 1.0 / loaded(&elliptic(8.0), &setting).span_efficiency().expect("e");
        factor / (1.0 + biplane(2.0 * depth)) - 1.0
    }));
    let long = Wing::new(vec![station(0.0, 100.0), station(5e5, 100.0)], true).expect("a foil");
    let under = greatest([0.25, 0.5, 1.0, 2.0].map(|depth: f64| {
        let setting = Setting { depth: Some(100.0 * depth), ..Setting::default() };
        let square = (4.0 * depth).powi(2);
        let k = loaded(&long, &setting).strips[0].lift_coefficient / (TAU * 0.05);
        k / ((square + 1.0) / (square + 2.0)) - 1.0
    }));
    Part {
        heading: "The whole foil",
        source: "L. Prandtl's elliptic wing and biplane factor, NACA Report 116, 1921; H. Glauert's series for straight taper, 1926; the depth \
                 effect of K. L. Wadlin, C. L. Shuford and J. R. McGehee, NACA Report 1232, 1955 (from memory). Theory against theory: the line has been \
                 held against no towed foil.",
        rows: vec![
            row("elliptic foils, aspect ratio 4 to 12: slope", 0.01, elliptic_slope, Unit::Percent(3)),
            row("rectangular and tapered foils: slope", 0.01, slope_off, Unit::Percent(3)),
            row("… induced drag", 0.01, drag_off, Unit::Percent(3)),
            row("induced drag under the surface, 5 to 50 % of the span deep", 0.01, depth, Unit::Percent(2)),
            row("lift of a section under the surface, ¼ to 2 chords deep", 0.01, under, Unit::Percent(2)),
        ],
        pictures: Vec::new(),
    }
}

/// Torsion constant of a thin round tube of 50 mm with a wall of 1 mm, in mm⁴.
fn round_tube() -> f64 {
    let material =
        PlyElastic::isotropic("sheet", Provenance::Tested, [26_000.0, 0.3], [300.0, 300.0, 170.0], 2700.0);
    let outline = (0..2000).map(|i| {
        let (s, c) = (TAU * f64::from(i) / 2000.0).sin_cos();
        Point::new(25.0 * c, 25.0 * s)
    });
    let build = SectionBuild {
        outline: outline.collect(),
        nose: -25.0,
        chord: 50.0,
        plies: vec![SkinPly::all_round(Layer { material, angle: 0.0, thickness: 1.0 })],
        core: air(),
        cut_outs: Vec::new(),
        flap: None,
    };
    SectionStiffness::of(&build, 0.0).expect("a section").torsion / 10_000.0
}

/// Young's modulus of a laminate alike in all directions, against Tsai and Pagano's invariants.
fn quasi_isotropic() -> f64 {
    let ply = demo::unidirectional_carbon();
    let share = 1.0 - ply.nu12 * ply.nu12 * ply.e2 / ply.e1;
    let (q11, q22, q12, q66) = (ply.e1 / share, ply.e2 / share, ply.nu12 * ply.e2 / share, ply.g12);
    let u1 = (3.0 * q11 + 3.0 * q22 + 2.0 * q12 + 4.0 * q66) / 8.0;
    let u4 = (q11 + q22 + 6.0 * q12 - 4.0 * q66) / 8.0;
    let layers = [0.0_f64, 45.0, -45.0, 90.0].map(|angle| Layer {
        material: ply.clone(),
        angle: angle.to_radians(),
        thickness: 0.2,
    });
    let skin = Layup::new(layers.to_vec()).expect("a skin");
    skin.constants().ex / ((u1 * u1 - u4 * u4) / u1) - 1.0
}

pub(crate) fn strength() -> Part {
    let table = parsed(include_str!("../reference/structure.toml"));
    let cases = table["bredt_batho"]["case"].as_array().expect("cases");
    let round = cases.iter().find(|case| case["name"].as_str() == Some("circular tube")).expect("the case");
    let torsion = round_tube() / (number(&round["J"]) * 1e12) - 1.0;
    let beam = |reach: f64, bending: f64| {
        let stations = [0.0, reach].map(|at| BeamStation::plain(at, bending, 2.0 * bending));
        Cantilever::new(stations.to_vec()).expect("a beam")
    };
    let example = &table["cantilever"]["example"][0];
    let get = |key: &str| number(&example[key]);
    let length = get("L") * 1e3;
    let tip = LoadCase {
        points: vec![PointLoad::acting_at(length, [get("P"), 0.0], [0.0, 0.0])],
        ..LoadCase::new("tip load", 1.0)
    };
    let under_tip = beam(length, get("E") * 1e-6 * get("I") * 1e12).under(&tip).expect("a result");
    let bends = under_tip.tip().deflection[0] / (get("deflection") * 1e3) - 1.0;
    let (reach, stiffness, peak) = (700.0, 3e7, 2.0_f64);
    let spread = (0..=400).map(|i| {
        let (s, c) = (FRAC_PI_2 * f64::from(i) / 400.0).sin_cos();
        LineLoad { at: reach * s, force: [peak * c, 0.0], torque: 0.0 }
    });
    let load = LoadCase { spread: vec![spread.collect()], ..LoadCase::new("elliptic", 1.0) };
    let unit = numbers(&table["cantilever"]["elliptic_M_d_slope_unit"])[1];
    let deflection = beam(reach, stiffness).under(&load).expect("a result").tip().deflection[0];
    let elliptic = deflection / (unit * peak * reach.powi(4) / stiffness) - 1.0;
    let euler = beam(900.0, 5e8).buckling_load() / (PI * PI * 5e8 / (4.0 * 900.0 * 900.0)) - 1.0;
    // 0.5 ∛(50 000 · 70 · 25) by hand.
    let wrinkling = wrinkling_stress(WRINKLING_FOR_DESIGN, 5e4, 70.0, 25.0) / 221.976 - 1.0;
    Part {
        heading: "Strength",
        source: "closed forms (R. M. Jones 1975, R. Bredt 1896, W. J. Roark, L. Euler 1744, N. J. Hoff and S. E. Mautner 1945; from memory). \
                 They say that the formulas are worked out right, not that a laminate of yours has the values that you write down: test it.",
        rows: vec![
            row("modulus of a laminate alike in all directions", 1e-12, quasi_isotropic(), Unit::Power),
            row("thin round tube: torsion", 1e-5, torsion, Unit::Power),
            row("cantilever, load at the tip: deflection", 1e-9, bends, Unit::Power),
            row("cantilever, elliptic load: deflection", 1e-5, elliptic, Unit::Power),
            row("column held at one end: buckling load", 1e-5, euler, Unit::Power),
            row("wrinkling stress of a face on foam", 1e-5, wrinkling, Unit::Power),
        ],
        pictures: Vec::new(),
    }
}
