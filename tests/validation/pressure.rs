//! Pressures along a section, and what a flap adds.

use super::measured::{flow, naca};
use super::page::{Part, Picture, Unit, row};
use super::parsed;
use plankform::export::chart::{Chart, Series};
use plankform::flow::{Conditions, DEFAULT_PANELS, Panelling, PotentialFlow, PressurePoint, ViscousSolution};
use plankform::section::{Flap, FlapSurface, HingeHeight};
use std::f64::consts::{PI, TAU};

/// The upper side from the nose to the trailing edge.
fn upper(pressure: &[PressurePoint]) -> Vec<(f64, f64)> {
    let nose = (0..pressure.len()).min_by(|&a, &b| pressure[a].x.total_cmp(&pressure[b].x)).expect("points");
    pressure[..=nose].iter().rev().map(|p| (p.x, p.cp)).collect()
}

fn between(line: &[(f64, f64)], x: f64) -> f64 {
    let next = line.iter().position(|p| p.0 >= x).expect("within").max(1);
    let ((x0, y0), (x1, y1)) = (line[next - 1], line[next]);
    y0 + (y1 - y0) * (x - x0) / (x1 - x0)
}

/// Measured and computed pressures where the digitised places say anything: on the steep nose a
/// thousandth of the chord is half the suction.
const FROM: f64 = 0.02;

struct Compared {
    measured: Vec<(f64, f64)>,
    solution: ViscousSolution,
    mean: f64,
    most: f64,
    suction: [f64; 2],
}

/// N. Gregory and C. L. O'Reilly, ARC R&M 3726, 1970.
fn compare(degrees: f64) -> Compared {
    let table = parsed(include_str!("../reference/measured_naca0012.toml"));
    let points = table["gregory_pressure"][&format!("angle_{degrees}")].as_array().expect("points");
    let pair = |p: &toml::Value| (super::number(&p[0]), super::number(&p[1]));
    let measured: Vec<(f64, f64)> = points.iter().map(pair).collect();
    let solution =
        flow(&naca("0012")).at(degrees.to_radians(), &Conditions::free(2.88e6, 9.0), None).expect("a flow");
    let line = upper(&solution.pressure);
    let off: Vec<f64> = measured
        .iter()
        .filter(|(x, _)| *x >= FROM)
        .map(|(x, cp)| {
            println!("{degrees}°, {x:.4}: pressure {:.3} measured {cp:.3}", between(&line, *x));
            between(&line, *x) - cp
        })
        .collect();
    let mean = (off.iter().map(|off| off * off).sum::<f64>() / off.len() as f64).sqrt();
    let least = measured.iter().map(|p| p.1).fold(f64::INFINITY, f64::min);
    let suction = [solution.cp_min, least];
    println!("{degrees}°: root of the mean square {mean:.4}, greatest suction {suction:.3?}");
    Compared { measured, mean, most: super::greatest(off), suction, solution }
}

fn picture(compared: &Compared, degrees: f64) -> String {
    let percent = |points: &[(f64, f64)]| points.iter().map(|(x, cp)| (100.0 * x, *cp)).collect();
    let pressure = &compared.solution.pressure;
    let upper = upper(pressure);
    let lower: Vec<(f64, f64)> = pressure[upper.len() - 1..].iter().map(|p| (p.x, p.cp)).collect();
    let mut series = vec![Series { name: "upper side".to_owned(), points: percent(&upper) }];
    if degrees != 0.0 {
        series.push(Series { name: "lower side".to_owned(), points: percent(&lower) });
    }
    let chart = Chart {
        title: format!("NACA 0012, Re 2.88 million, {degrees}°: pressure"),
        across: "percent of chord".to_owned(),
        up: "pressure coefficient".to_owned(),
        downwards: true,
        series,
        measured: vec![Series { name: "R&M 3726".to_owned(), points: percent(&compared.measured) }],
        ..Chart::default()
    };
    chart.to_svg()
}

pub(crate) fn gregory() -> Part {
    let [level, steep] = [0.0, 10.0].map(compare);
    let mut rows = Vec::new();
    for (degrees, c) in [(0, &level), (10, &steep)] {
        rows.push(row(
            format!("{degrees}°: pressure coefficient, root of the mean square"),
            None,
            c.mean,
            Unit::Plain(3),
        ));
        rows.push(row("… at most", None, c.most, Unit::Plain(2)));
    }
    let [computed, measured] = steep.suction;
    rows.push(row("10°: greatest suction", None, computed / measured - 1.0, Unit::Percent(1)));
    Part {
        heading: "Pressures on NACA 0012",
        source: "N. Gregory and C. L. O'Reilly, ARC R&M 3726, 1970: Re 2.88e6, upper side, digitised from a photocopy and so \
                 approximate; from 2 % of the chord on. Computed with free transition, N = 9.",
        rows,
        pictures: vec![
            Picture {
                name: "pressure-0",
                caption: "Pressure on NACA 0012 at 0°, computed and measured",
                svg: picture(&level, 0.0),
            },
            Picture {
                name: "pressure-10",
                caption: "Pressure on NACA 0012 at 10°, computed and measured",
                svg: picture(&steep, 10.0),
            },
        ],
    }
}

#[test]
fn pressures_follow_those_of_gregory_and_oreilly() {
    let [level, steep] = [0.0, 10.0].map(compare);
    assert!(level.mean < 0.03 && level.most < 0.07, "{} {}", level.mean, level.most);
    assert!(steep.mean < 0.12 && steep.most < 0.3, "{} {}", steep.mean, steep.most);
    assert!((steep.suction[0] / steep.suction[1] - 1.0).abs() < 0.1, "{:?}", steep.suction);
}

/// Deflection of the flaps, radians: small, so that the theory holds and no flow separates at the hinge.
const DEFLECTION: f64 = 0.05;

/// What a flap adds to the lift coefficient at 0°, for each radian: by thin-section theory, without
/// friction, and with it at a Reynolds number.
///
/// H. Glauert, The Elements of Aerofoil and Airscrew Theory (1926), chapter XI (from memory):
/// 2 (π − θ + sin θ), cos θ = 1 − 2 x of the hinge.
fn flap_lift(hinge: f64, reynolds: f64) -> [f64; 3] {
    let theta = (1.0 - 2.0 * hinge).acos();
    let deflected = |angle: f64| {
        let flap = Flap { hinge, height: HingeHeight::Middle, angle, surface: FlapSurface::Broken };
        naca("0006").flapped(flap).expect("a flap")
    };
    let [straight, down] = [0.0, DEFLECTION].map(deflected);
    let potential = |section| {
        PotentialFlow::new(&Panelling::of(section, DEFAULT_PANELS).expect("panels"))
            .expect("a flow")
            .at(0.0)
            .cl
    };
    let viscous = |section| flow(section).at(0.0, &Conditions::free(reynolds, 9.0), None).expect("a flow").cl;
    [
        2.0 * (PI - theta + theta.sin()),
        (potential(&down) - potential(&straight)) / DEFLECTION,
        (viscous(&down) - viscous(&straight)) / DEFLECTION,
    ]
}

pub(crate) fn flap() -> Part {
    let mut rows = Vec::new();
    for hinge in [0.7, 0.8] {
        let [thin, potential, viscous] = flap_lift(hinge, 1e7);
        let of = format!("flap of {:.0} % of the chord", 100.0 * (1.0 - hinge));
        rows.push(row(
            format!("{of}: without friction (it is more)"),
            None,
            potential / thin - 1.0,
            Unit::Percent(1),
        ));
        rows.push(row(
            format!("{of}: with friction (it is less)"),
            None,
            viscous / thin - 1.0,
            Unit::Percent(1),
        ));
    }
    Part {
        heading: "What a flap adds",
        source: "H. Glauert's theory of thin sections, 1926: lift by a flap at small angles (2.9°), NACA 0006, Re 1e7. Friction takes \
                 from it, and thickness adds: the theory has neither.",
        rows,
        pictures: Vec::new(),
    }
}

#[test]
fn flaps_add_what_thin_section_theory_says_less_what_friction_takes() {
    for hinge in [0.7, 0.8] {
        let [thin, potential, viscous] = flap_lift(hinge, 1e7);
        println!(
            "hinge {hinge}: thin {thin:.3}, without friction {potential:.3}, with {viscous:.3} ({:.3} of 2π)",
            viscous / TAU
        );
        assert!((0.97..1.06).contains(&(potential / thin)), "{}", potential / thin);
        assert!((0.75..1.0).contains(&(viscous / thin)), "{}", viscous / thin);
        assert!(viscous < potential);
    }
}
