//! Layers along given speeds against similar flows and the laws of the flat plate.
//!
//! The values stand in `tests/reference/boundary_layer.toml`, with their sources. Run with
//! `--nocapture` to see what was measured against what.

// Printing what was measured is part of the purpose here.
#![allow(clippy::print_stdout)]

use plankform::flow::{Conditions, LayerPoint, ViscousError, layer_along};

fn reference() -> toml::Table {
    include_str!("reference/boundary_layer.toml").parse().expect("a table")
}

fn number(value: &toml::Value) -> f64 {
    value.as_float().or_else(|| value.as_integer().map(|i| i as f64)).expect("a number")
}

fn list(table: &toml::Value, key: &str) -> Vec<f64> {
    table[key].as_array().expect("a list").iter().map(number).collect()
}

/// Lengths from `from` to one, evenly spread over their logarithm.
fn lengths(from: f64, count: usize) -> Vec<f64> {
    (0..count).map(|i| from.powf(1.0 - i as f64 / (count - 1) as f64)).collect()
}

fn along(lengths: &[f64], speed: impl Fn(f64) -> f64, conditions: &Conditions) -> Vec<LayerPoint> {
    let stations: Vec<[f64; 2]> = lengths.iter().map(|&x| [x, speed(x)]).collect();
    layer_along(&stations, conditions).expect("a layer")
}

/// Falkner and Skan 1931, Hartree 1937, `[falkner_skan]`: computed there, with Blasius 1908
/// (beta = 0) and the stagnation flow of Hiemenz 1911 (beta = 1) among them.
#[test]
fn similar_flows() {
    let reference = reference();
    let table = &reference["falkner_skan"];
    let [beta, fpp0, theta, shape] = ["beta", "fpp0", "theta", "H"].map(|key| list(table, key));
    let mut worst = [0.0_f64; 3];
    for i in 0..beta.len() {
        // At separation itself there is no friction to compare, and the march stops short of it.
        if beta[i] < -0.185 {
            continue;
        }
        let exponent = beta[i] / (2.0 - beta[i]);
        let layer = along(&lengths(1e-3, 120), |x| x.powf(exponent), &Conditions::free(1e5, 20.0));
        assert_eq!(layer.len(), 120, "beta {}: the layer ends early", beta[i]);
        let last = layer.last().expect("a station");
        let root = (1e5 * last.speed * last.length).sqrt();
        let scale = (2.0 - beta[i]).sqrt();
        let computed = [last.theta / last.length * root, last.shape(), last.cf * root];
        let exact = [theta[i] * scale, shape[i], 2.0 * fpp0[i] / scale];
        for k in 0..3 {
            worst[k] = worst[k].max((computed[k] / exact[k] - 1.0).abs());
        }
        println!("beta {:6.3}: theta, H, cf computed {computed:.4?} exact {exact:.4?}", beta[i]);
    }
    println!("greatest errors of theta, H, cf: {worst:.5?}");
    assert!(worst.iter().all(|&error| error < 0.01), "{worst:?}");
}

/// Howarth's flow, speed falling evenly: `[thwaites]`, exact 0.1199 from memory.
#[test]
fn separation_in_evenly_falling_speed() {
    let exact = number(&reference()["thwaites"]["x_separation_howarth_exact"]);
    let lengths: Vec<f64> = (0..400).map(|i| 1e-4 + 0.13 * f64::from(i) / 399.0).collect();
    let layer = along(&lengths, |x| 1.0 - x, &Conditions::free(1e5, 20.0));
    // The march of given speeds ends just short of separation, where no layer goes with them.
    let end = layer.last().expect("a station").length;
    println!("Howarth's flow: the layer ends at {end:.4}, exact separation {exact:.4}");
    assert!((end / exact - 1.0).abs() < 0.025, "{end}");
}

/// Prandtl and Schlichting, in H. Schlichting, "Boundary-Layer Theory": `[prandtl_schlichting]`,
/// from memory. Re_tr = 3e5 with the allowance A that is computed there for this law.
#[test]
fn turbulent_plate() {
    let reference = reference();
    let table = &reference["prandtl_schlichting"];
    let (transition, allowance) = (list(table, "Re_tr")[0], list(table, "A_computed_0p455")[0]);
    let mut worst: f64 = 0.0;
    for (reynolds, turbulent) in std::iter::zip(list(table, "Re"), list(table, "CF_turbulent")) {
        if reynolds < 1.5e6 {
            continue;
        }
        let conditions =
            Conditions { trip_upper: Some(transition / reynolds), ..Conditions::free(reynolds, 20.0) };
        let layer = along(&lengths(1e3 / reynolds, 300), |_| 1.0, &conditions);
        let last = layer.last().expect("a station");
        let (computed, law) = (2.0 * last.theta, turbulent - allowance / reynolds);
        worst = worst.max((computed / law - 1.0).abs());
        println!("Re {reynolds:.0e}: CF computed {computed:.6}, law {law:.6}, H {:.3}", last.shape());
    }
    println!("greatest difference {:.2} %", 100.0 * worst);
    assert!(worst < 0.03, "{worst}");
}

/// G. B. Schubauer and H. K. Skramstad, NACA Report 909, 1948: `[transition_flat_plate]`, from
/// memory. Their stream was as quiet as any; N = 9 goes with it.
#[test]
fn transition_on_a_plate() {
    let reference = reference();
    let table = &reference["transition_flat_plate"];
    let begin = number(&table["Rex_schubauer_skramstad_begin"]);
    let end = number(&table["Rex_schubauer_skramstad_end"]);
    let place = |amplification: f64| {
        let layer = along(&lengths(1e-3, 400), |_| 1.0, &Conditions::free(1e7, amplification));
        let turbulent = layer.iter().find(|point| point.turbulent).expect("transition");
        1e7 * turbulent.length
    };
    let at = place(9.0);
    println!("plate, N = 9: Re_x of transition {at:.3e}, measured {begin:.1e} to {end:.1e}");
    assert!((begin..end).contains(&at), "{at}");
    assert!(place(5.0) < at && place(3.0) < place(5.0));
}

#[test]
fn refuses_what_is_no_wall() {
    let conditions = Conditions::free(1e6, 9.0);
    let bad = [
        vec![],
        vec![[0.1, 1.0]],
        vec![[0.1, 1.0], [0.1, 1.0]],
        vec![[0.1, 1.0], [0.2, -1.0]],
        vec![[0.1, 1.0], [f64::NAN, 1.0]],
        vec![[0.0, 1.0], [0.1, 1.0]],
    ];
    for stations in bad {
        assert!(matches!(layer_along(&stations, &conditions), Err(ViscousError::Station(_))), "{stations:?}");
    }
    let stations = [[0.1, 1.0], [0.2, 1.0]];
    assert!(matches!(
        layer_along(&stations, &Conditions::free(f64::NAN, 9.0)),
        Err(ViscousError::Reynolds(_))
    ));
    assert!(layer_along(&stations, &Conditions::free(1e6, 0.0)).is_err());
    assert!(layer_along(&stations, &Conditions { trip_upper: Some(2.0), ..conditions }).is_err());
}
