//! `plankform lift` as a builder types it: real units, finishes, water, cavitation, layers.

mod common;

use common::Bench;
use plankform::flow::{GRAVITY, Salinity, Water};
use serde_json::Value;

fn lift(bench: &Bench, arguments: &[&str]) -> Value {
    let answer = bench.run(&[&["lift"], arguments, &["--format", "json"]].concat());
    assert_eq!(answer.status, 0, "{arguments:?}: {}", answer.err);
    answer.json()
}

fn number(value: &Value) -> f64 {
    value.as_f64().unwrap_or_else(|| panic!("no number: {value}"))
}

fn points(curve: &Value) -> &Vec<Value> {
    curve["points"].as_array().expect("points")
}

/// Chord, speed and water make the Reynolds number, and coefficients become forces.
#[test]
fn real_units_follow_from_chord_speed_and_water() {
    let bench = Bench::new();
    let real = ["--chord", "120 mm", "--speed", "10 kn,14 kn", "--water", "fresh", "--temperature", "12 °C"];
    let typed = [&["NACA 2412", "--angles", "0:4:2", "--depth", "450 mm"], &real[..]].concat();
    let json = lift(&bench, &typed);
    let water = Water::at(Salinity::Fresh, 12.0).expect("water");
    assert_eq!(number(&json["surroundings"]["density_kg_m3"]), water.density);
    let curves = json["curves"].as_array().expect("curves");
    assert_eq!(curves.len(), 2);
    for (curve, knots) in curves.iter().zip([10.0, 14.0]) {
        let speed = knots * 1852.0 / 3600.0;
        assert!((number(&curve["speed_m_s"]) - speed).abs() < 1e-12);
        assert!((number(&curve["reynolds"]) / water.reynolds(0.12, speed) - 1.0).abs() < 1e-12);
        let sigma = water.cavitation_number(0.45, speed);
        assert!((number(&curve["cavitation_number"]) - sigma).abs() < 1e-12);
        for point in points(curve) {
            // By hand: ½ ρ V² c for each metre of span.
            let force = 0.5 * water.density * speed * speed * 0.12;
            let wanted = [
                ("lift_n_per_m", force * number(&point["cl"])),
                ("lift_kg_per_m", force * number(&point["cl"]) / GRAVITY),
                ("drag_n_per_m", force * number(&point["cd"])),
                ("moment_nm_per_m", 0.12 * force * number(&point["cm"])),
                (
                    "cavitation_speed_m_s",
                    water.inception_speed(0.45, number(&point["cp_min"])).expect("suction"),
                ),
            ];
            for (key, wanted) in wanted {
                assert!(
                    (number(&point[key]) - wanted).abs() < 1e-9 * wanted.abs().max(1.0),
                    "{key}: {point}"
                );
            }
        }
    }
    // A known Reynolds number at a known chord is a speed.
    let reynolds = number(&curves[0]["reynolds"]).to_string();
    let other =
        lift(&bench, &[&["NACA 2412", "--angles", "0", "--re", &reynolds], &real[..2], &real[4..]].concat());
    assert!((number(&other["curves"][0]["speed_m_s"]) - 10.0 * 1852.0 / 3600.0).abs() < 1e-9);

    let text = bench.run(&[&["lift"], &typed[..], &["--svg", "lift.svg"]].concat());
    for word in [
        "fresh water of 12 °C, chord 120 mm, 450 mm below",
        "10 kn (5.14 m/s)",
        "lift, N/m",
        "cavitates from",
    ] {
        assert!(text.out.contains(word), "{word}: {}", text.out);
    }
    let svg = std::fs::read_to_string(bench.path().join("lift.svg")).expect("a picture");
    for word in ["lift, N/m", "drag, N/m", "14 kn", "speed at 450 mm depth, kn", "no cavitation"] {
        assert!(svg.contains(word), "{word}");
    }
    let csv = bench.run(&[&["lift"], &typed[..], &["--format", "csv"]].concat()).out;
    let heading: Vec<&str> = csv.lines().next().expect("a heading").split(',').collect();
    let column = heading.iter().position(|name| *name == "lift_n_per_m").expect("a column");
    let first = csv.lines().nth(1).expect("a row").split(',').nth(column).expect("a cell");
    assert!(
        (first.parse::<f64>().expect("a number") - number(&points(&curves[0])[0]["lift_n_per_m"])).abs()
            < 1e-5
    );
    assert!(heading.ends_with(&["hinge_moment_nm_per_m", "cavitation_speed_m_s"]));
}

#[test]
fn a_rough_nose_stands_beside_the_smooth_one() {
    let bench = Bench::new();
    let json = lift(&bench, &["NACA 2412", "--re", "1e6", "--angles", "0:4:2", "--finish", "both"]);
    let curves = json["curves"].as_array().expect("curves");
    assert_eq!(
        curves.iter().map(|c| c["finish"].as_str()).collect::<Vec<_>>(),
        [Some("smooth"), Some("rough")]
    );
    for (smooth, rough) in points(&curves[0]).iter().zip(points(&curves[1])) {
        assert!(number(&rough["cd"]) > 1.2 * number(&smooth["cd"]), "{smooth} {rough}");
        assert!(number(&rough["transition_upper"]) < 0.03);
        assert!(
            (number(&rough["cd_friction"]) + number(&rough["cd_pressure"]) - number(&rough["cd"])).abs()
                < 1e-12
        );
    }
    for key in ["cd_min", "cd_min_cl", "cd_min_deg", "lift_over_drag_max", "slope_per_deg", "zero_lift_deg"] {
        assert!(curves[0][key].is_f64(), "{key}");
    }
    let text = bench.run(&["lift", "NACA 2412", "--re", "1e6", "--angles", "2", "--finish", "both"]).out;
    assert!(
        text.contains("smooth nose") && text.contains("rough nose") && text.contains("least drag"),
        "{text}"
    );
    // Without --finish the curve is that of the smooth nose.
    let plain = lift(&bench, &["NACA 2412", "--re", "1e6", "--angles", "0:4:2"]);
    assert_eq!(plain["curves"][0], curves[0]);
}

#[test]
fn the_band_lies_between_still_and_natural_water() {
    let bench = Bench::new();
    let typed = ["NACA 4412", "--re", "5e5", "--angles", "0:4:2", "--amplification", "9,6,4"];
    let json = lift(&bench, &typed);
    let curves = json["curves"].as_array().expect("curves");
    assert_eq!(curves.iter().map(|c| number(&c["amplification"])).collect::<Vec<_>>(), [9.0, 6.0, 4.0]);
    let band = &json["bands"][0];
    assert_eq!(band["amplification"], serde_json::json!([9.0, 4.0]));
    for (i, point) in points(band).iter().enumerate() {
        for key in ["cl", "cd"] {
            let [from, to] = [0, 1].map(|end| number(&point[key][end]));
            let [still, natural] = [0, 2].map(|curve| number(&points(&curves[curve])[i][key]));
            assert_eq!([from, to], [still.min(natural), still.max(natural)]);
        }
    }
    let text = bench.run(&[&["lift"], &typed[..], &["--svg", "band.svg"]].concat()).out;
    assert!(text.contains("between still water (N = 9) and natural water (N = 4)"), "{text}");
    let svg = std::fs::read_to_string(bench.path().join("band.svg")).expect("a picture");
    assert!(svg.contains("fill-opacity"));
    // One exponent is no band.
    assert!(lift(&bench, &["NACA 4412", "--re", "5e5", "--angles", "0"])["bands"].is_null());
}

#[test]
fn layers_are_given_on_request() {
    let bench = Bench::new();
    let typed = ["NACA 0012", "--re", "1e6", "--angles", "2", "--layers"];
    let layers = &lift(&bench, &typed)["curves"][0]["points"][0]["layers"];
    for side in ["upper", "lower", "wake"] {
        let column = |name: &str| layers[side][name].as_array().expect("a column");
        let count = column("x").len();
        assert!(count > 20, "{side}");
        for name in
            ["y", "length", "edge_speed", "theta", "delta_star", "shape", "cf", "amplification", "turbulent"]
        {
            assert_eq!(column(name).len(), count, "{side} {name}");
        }
        for i in 0..count {
            let shape = number(&column("delta_star")[i]) / number(&column("theta")[i]);
            assert!((number(&column("shape")[i]) - shape).abs() < 1e-12);
        }
    }
    // Momentum thickness of the wake's end is half of the drag, but for the speed there.
    let theta = number(layers["wake"]["theta"].as_array().and_then(|t| t.last()).expect("a last"));
    let cd = number(&lift(&bench, &typed)["curves"][0]["points"][0]["cd"]);
    assert!((2.0 * theta / cd - 1.0).abs() < 0.1, "{theta} {cd}");
    let csv = bench.run(&[&["lift"], &typed[..], &["--format", "csv"]].concat()).out;
    assert!(csv.starts_with("reynolds,flap_deg,angle_deg,side,x_over_chord") && csv.lines().count() > 100);
    let text = bench.run(&[&["lift"], &typed[..]].concat()).out;
    assert!(text.contains("layer of the upper side at 2.00°") && text.contains("turbulent"), "{text}");
}

/// Without friction there are forces, a hinge moment and a bucket all the same.
#[test]
fn without_friction_there_are_forces_too() {
    let bench = Bench::new();
    let typed = ["NACA 2412", "--inviscid", "--angles", "0:4:2", "--flap", "5", "--hinge", "0.7"];
    let real = ["--chord", "120 mm", "--speed", "10 kn", "--depth", "450 mm", "--cavitation-margin", "0.2"];
    let json = lift(&bench, &[&typed[..], &real].concat());
    for point in points(&json["curves"][0]) {
        assert!(number(&point["lift_n_per_m"]) > 0.0 && point["drag_n_per_m"].is_null());
        let speed = |key: &str| number(&point[key]);
        let water = Water::at(Salinity::Sea, 15.0).expect("water");
        let wanted = water.inception_speed(0.45, 1.2 * number(&point["cp_min"])).expect("suction");
        assert!((speed("cavitation_speed_m_s") - wanted).abs() < 1e-9);
        // The flap's chord is three tenths, and a little: the axis lies in its plane.
        let share = number(&point["hinge_moment_nm_per_m"]) / number(&point["hinge_moment"]);
        let force = 0.5 * water.density * (10.0_f64 * 1852.0 / 3600.0).powi(2) * 0.12 * 0.12;
        assert!((share / force - 0.09).abs() < 0.002, "{}", share / force);
    }
    assert!(json["curves"][0]["cavitation_free_cl"].is_array());
    let text = bench.run(&[&["lift"], &typed[..], &real, &["--svg", "l.svg"]].concat()).out;
    for word in ["hinge", "lift, N/m", "with 20 % to spare"] {
        assert!(text.contains(word), "{word}: {text}");
    }
    let svg = std::fs::read_to_string(bench.path().join("l.svg")).expect("a picture");
    assert!(svg.contains("lift without cavitation, 20 % to spare") && !svg.contains("against drag"));
}

#[test]
fn several_of_everything_come_in_one_order() {
    let bench = Bench::new();
    let typed = ["NACA 0012", "--re", "5e5,1e6", "--flap", "0,5", "--hinge", "0.75", "--angles", "0:2:2"];
    let of = |json: &Value| -> Vec<(f64, f64, f64)> {
        let curves = json["curves"].as_array().expect("curves").iter();
        curves
            .map(|c| (number(&c["flap_deg"]), number(&c["reynolds"]), number(&points(c)[1]["cl"])))
            .collect()
    };
    let all = of(&lift(&bench, &typed));
    let heads: Vec<(f64, f64)> = all.iter().map(|c| (c.0, c.1)).collect();
    assert_eq!(heads, [(0.0, 5e5), (0.0, 1e6), (5.0, 5e5), (5.0, 1e6)]);
    // Each is what it is alone.
    let alone = of(&lift(
        &bench,
        &["NACA 0012", "--re", "1e6", "--flap", "5", "--hinge", "0.75", "--angles", "0:2:2"],
    ));
    assert_eq!(alone[0], all[3]);
}

#[test]
fn what_does_not_go_together_is_said() {
    let bench = Bench::new();
    let base = ["lift", "NACA 2412", "--angles", "2"];
    for (arguments, says) in [
        (
            &["--re", "1e6", "--speed", "10 kn", "--chord", "120 mm"][..],
            "the Reynolds number follows from chord and speed",
        ),
        (&["--chord", "120 mm"], "--re"),
        (&["--speed", "10 kn"], "--chord"),
        (&["--chord", "120 mm", "--speed", "10"], "m/s, kn or km/h"),
        (&["--chord", "120 mm", "--speed", "900 kn"], "out of bounds: 0.1 m/s to 50 m/s"),
        (&["--chord", "120 mm", "--speed", "10 kn,NaN kn"], "finite"),
        (&["--chord", "120 mm", "--speed", "-4 kn"], "out of bounds"),
        (&["--re", "1e6", "--temperature", "50 °C"], "out of bounds: 0 °C to 30 °C"),
        (&["--re", "1e6", "--depth", "90 m"], "out of bounds: 0 mm to 5 m"),
        (&["--re", "1e6", "--water", "salt"], "sea"),
        (&["--re", "1e6", "--cavitation-margin", "0.2"], "--depth"),
        (&["--re", "1e6", "--depth", "400 mm", "--cavitation-margin", "20"], "0 to 2"),
        (&["--re", "1e6", "--finish", "rough", "--trip", "0.1"], "--trip"),
        (&["--inviscid", "--finish", "both"], "--finish"),
        (&["--inviscid", "--layers"], "--layers"),
        (&["--re", "1e6", "--layers", "--pressure", "--format", "csv"], "one table at a time"),
        (&["--re", "1e6", "--amplification", "9,40"], "40 is outside 0.1 to 20"),
    ] {
        let answer = bench.run(&[&base, arguments].concat());
        assert_eq!((answer.status, answer.out.as_str()), (2, ""), "{arguments:?}: {}", answer.err);
        assert!(answer.err.contains(says), "{arguments:?} says {}", answer.err);
    }
    assert!(bench.listing().is_empty());
}

/// A table of coordinates leaves a hair open at a sharp edge: it is sharp all the same, and every point
/// of its curve is found. The table is that of `tests/reference/measured_low_re.toml`.
#[test]
fn a_section_from_coordinates_has_a_curve() {
    let bench = Bench::new();
    let table: toml::Table = include_str!("reference/measured_low_re.toml").parse().expect("a table");
    let mut text = String::from("cambered\n");
    for point in table["section"]["points"].as_array().expect("points") {
        text.push_str(&format!("{} {}\n", point[0], point[1]));
    }
    bench.file("cambered.txt", &text);
    let json = lift(&bench, &["cambered.txt", "--re", "4.6e5", "--angles", "-2:6:2"]);
    assert_eq!(json["curves"][0]["converged"], 5);
    // Edges opened a little more are blunt, and have their curves too.
    for edge in ["0.01 %", "0.1 %", "1 %"] {
        let typed = ["cambered.txt", "--re", "4.6e5", "--angles", "0:4:2", "--trailing-edge", edge];
        assert_eq!(lift(&bench, &typed)["curves"][0]["converged"], 3, "{edge}");
    }
}
