//! Flow without friction, cavitation, and layers by themselves.

use super::karman_trefftz::KarmanTrefftz;
use super::page::{Part, Unit, row};
use super::{greatest, number, numbers, parsed};
use plankform::flow::{
    Conditions, DEFAULT_PANELS, LayerPoint, Panelling, PotentialFlow, Salinity, Viscous, Water, layer_along,
};
use plankform::section::{Section, TrailingEdge};

pub(crate) fn exact_sections() -> Part {
    let theory = parsed(include_str!("../reference/theory.toml"));
    let (mut worst, mut least_fall) = ([[0.0_f64; 3]; 2], f64::INFINITY);
    for entry in theory["karman_trefftz"]["section"].as_array().expect("sections") {
        let mu = numbers(&entry["mu"]);
        let exact = KarmanTrefftz {
            mu: [mu[0], mu[1]],
            power: number(&entry["n"]),
            nose: number(&entry["x_le"]),
            chord: number(&entry["chord"]),
        };
        let off = [100, 200].map(|panels| {
            let flow = PotentialFlow::new(&exact.panelling(panels)).expect("a flow");
            let mut off = [0.0_f64; 3];
            for degrees in [0.0_f64, 4.0, 10.0] {
                let solution = flow.at(degrees.to_radians());
                let cl = number(&entry[&format!("cl_a{degrees}")]);
                if cl != 0.0 {
                    off[0] = off[0].max((solution.cl / cl - 1.0).abs());
                }
                for (i, point) in solution.pressure.iter().enumerate().filter(|(_, p)| p.x < 0.98) {
                    let cp = exact.cp(exact.angle(i, panels), degrees.to_radians());
                    off[1] = off[1].max((point.cp - cp).abs());
                }
                // Greatest suction: the exact one by looking round closely.
                let all = (1..20_000).map(|i| -exact.cp(exact.angle(i, 20_000), degrees.to_radians()));
                let suction = all.fold(0.0, f64::max);
                off[2] = off[2].max((-solution.cp_min / suction - 1.0).abs());
            }
            off
        });
        least_fall = least_fall.min((off[0][0] / off[1][0]).min(off[0][1] / off[1][1]));
        for (worst, off) in worst.iter_mut().zip(off) {
            (0..3).for_each(|k| worst[k] = worst[k].max(off[k]));
        }
    }
    let [lift, pressure, suction] = worst[1];
    Part {
        heading: "Flow without friction: exact sections",
        source: "T. von Kármán and E. Trefftz, 1918, at 0°, 4° and 10°; 200 panels.",
        rows: vec![
            row("lift", 0.000_5, lift, Unit::Percent(4)),
            row("pressure coefficient ahead of 98 % of the chord", 0.005, pressure, Unit::Plain(4)),
            row("greatest suction, which decides cavitation", None, suction, Unit::Percent(2)),
            row("what doubling the panels leaves of the error", 0.286, 1.0 / least_fall, Unit::Percent(1)),
        ],
        pictures: Vec::new(),
    }
}

pub(crate) fn closed_sections() -> Part {
    let theory = parsed(include_str!("../reference/theory.toml"));
    let (mut lift, mut moment) = (0.0_f64, 0.0_f64);
    for entry in theory["inviscid_lift"]["section"].as_array().expect("sections") {
        let name = format!("NACA {}", entry["name"].as_str().expect("a name"));
        let section = Section::from_designation(&name, TrailingEdge::Closed).expect("a section");
        let flow =
            PotentialFlow::new(&Panelling::of(&section, DEFAULT_PANELS).expect("panels")).expect("flow");
        let loads = numbers(&entry["cl"]).into_iter().zip(numbers(&entry["cm_c4"]));
        for (degrees, (cl, cm)) in numbers(&entry["alpha"]).into_iter().zip(loads) {
            let solution = flow.at(degrees.to_radians());
            lift = lift.max((solution.cl - cl).abs() / if cl == 0.0 { 1.0 } else { cl.abs() });
            moment = moment.max((solution.cm - cm).abs());
        }
    }
    Part {
        heading: "Flow without friction: NACA sections",
        source: "a boundary integral over the closed sections, good to 1e-6, made apart from the program.",
        rows: vec![
            row("lift", 0.001, lift, Unit::Percent(3)),
            row("moment about the quarter chord", None, moment, Unit::Plain(5)),
        ],
        pictures: Vec::new(),
    }
}

pub(crate) fn cavitation() -> Part {
    let table = parsed(include_str!("../reference/water.toml"));
    let (mut density, mut viscosity, mut vapour) = (0.0_f64, 0.0_f64, 0.0_f64);
    for row in table["ittc"]["row"].as_array().expect("rows") {
        for (salinity, word) in [(Salinity::Fresh, "fresh"), (Salinity::Sea, "sea")] {
            let water = Water::at(salinity, number(&row["T"])).expect("water");
            let published = |key: &str| row.get(format!("{word}_{key}")).map(number);
            let off = |found: f64, key: &str| published(key).map_or(0.0, |value| (found / value - 1.0).abs());
            density = density.max(off(water.density, "rho"));
            viscosity = viscosity.max(off(1e6 * water.viscosity, "nu_e6"));
            vapour = vapour.max(off(1e-3 * water.vapour_pressure, "pv_kPa"));
        }
    }
    // By hand, for sea water of 15 °C at 0.5 m: √(2 (101 325 + 1025.976 · 9.80665 · 0.5 − 1673.87)/1025.976).
    let speed = Water::at(Salinity::Sea, 15.0).and_then(|water| water.inception_speed(0.5, -1.0));
    let by_hand = (2.0_f64 * 104_681.8 / 1025.976).sqrt();
    Part {
        heading: "Water and cavitation",
        source: "ITTC 7.5-02-01-03 (2011), fresh and sea water; the speed of inception by hand.",
        rows: vec![
            row("density", None, density, Unit::Percent(4)),
            row("viscosity", None, viscosity, Unit::Percent(3)),
            row("vapour pressure", None, vapour, Unit::Percent(2)),
            row(
                "speed at which a suction of 1 boils at 0.5 m",
                None,
                speed.expect("a speed") / by_hand - 1.0,
                Unit::Percent(4),
            ),
        ],
        pictures: Vec::new(),
    }
}

fn along(lengths: &[f64], speed: impl Fn(f64) -> f64, conditions: &Conditions) -> Vec<LayerPoint> {
    let stations: Vec<[f64; 2]> = lengths.iter().map(|&x| [x, speed(x)]).collect();
    layer_along(&stations, conditions).expect("a layer")
}

/// Lengths from `from` to one, evenly spread over their logarithm.
fn lengths(from: f64, count: usize) -> Vec<f64> {
    (0..count).map(|i| from.powf(1.0 - i as f64 / (count - 1) as f64)).collect()
}

pub(crate) fn layers() -> Part {
    let reference = parsed(include_str!("../reference/boundary_layer.toml"));
    let table = &reference["falkner_skan"];
    let [beta, fpp0, theta, shape] = ["beta", "fpp0", "theta", "H"].map(|key| numbers(&table[key]));
    let mut similar = 0.0_f64;
    // At separation itself there is no friction to compare, and the march stops short of it.
    for i in (0..beta.len()).filter(|&i| beta[i] >= -0.185) {
        let exponent = beta[i] / (2.0 - beta[i]);
        let layer = along(&lengths(1e-3, 120), |x| x.powf(exponent), &Conditions::free(1e5, 20.0));
        let last = layer.last().expect("a station");
        let (root, scale) = ((1e5 * last.speed * last.length).sqrt(), (2.0 - beta[i]).sqrt());
        let computed = [last.theta / last.length * root, last.shape(), last.cf * root];
        let exact = [theta[i] * scale, shape[i], 2.0 * fpp0[i] / scale];
        similar = similar.max(greatest((0..3).map(|k| computed[k] / exact[k] - 1.0)));
    }
    let table = &reference["prandtl_schlichting"];
    let (transition, allowance) = (numbers(&table["Re_tr"])[0], numbers(&table["A_computed_0p455"])[0]);
    let mut plate = 0.0_f64;
    for (reynolds, turbulent) in std::iter::zip(numbers(&table["Re"]), numbers(&table["CF_turbulent"])) {
        if reynolds < 1.5e6 {
            continue;
        }
        let free = Conditions::free(reynolds, 20.0);
        let conditions = Conditions { trip_upper: Some(transition / reynolds), ..free };
        let layer = along(&lengths(1e3 / reynolds, 300), |_| 1.0, &conditions);
        let law = turbulent - allowance / reynolds;
        plate = plate.max((2.0 * layer.last().expect("a station").theta / law - 1.0).abs());
    }
    let section = Section::from_designation("NACA 0012", TrailingEdge::Closed).expect("a section");
    let flow = Viscous::new(&Panelling::of(&section, 140).expect("panels")).expect("a flow");
    let at = |angle: f64| flow.at(angle, &Conditions::free(1e6, 9.0), None).expect("a flow");
    let (up, down) = (at(0.05), at(-0.05));
    let asymmetry = greatest([up.cl + down.cl, up.cd - down.cd, up.cm + down.cm]);
    Part {
        heading: "Layers",
        source: "V. M. Falkner and S. W. Skan, 1931, with Blasius and Hiemenz among them; L. Prandtl and H. Schlichting's law of the \
                 turbulent plate, Re 2e6 to 1e9; symmetry.",
        rows: vec![
            row("similar laminar flows: θ, H and friction", 0.01, similar, Unit::Percent(3)),
            row("turbulent plate: drag", 0.03, plate, Unit::Percent(1)),
            row("symmetric section at ±2.9°: sums that are nothing", 1e-6, asymmetry, Unit::Power),
        ],
        pictures: Vec::new(),
    }
}
