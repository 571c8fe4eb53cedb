//! Water against the tables of ITTC 7.5-02-01-03 (2011), `tests/reference/water.toml`, and the
//! speed at which it boils against arithmetic by hand.

// Printing what was measured is part of the purpose here.
#![allow(clippy::print_stdout)]

use plankform::flow::{Salinity, Water};

fn number(value: &toml::Value) -> f64 {
    value.as_float().or_else(|| value.as_integer().map(|i| i as f64)).expect("a number")
}

fn list(table: &toml::Value, key: &str) -> Vec<f64> {
    table[key].as_array().expect("a list").iter().map(number).collect()
}

#[test]
fn water_agrees_with_the_published_tables() {
    let table: toml::Table = include_str!("reference/water.toml").parse().expect("a table");
    for row in table["ittc"]["row"].as_array().expect("rows") {
        let celsius = number(&row["T"]);
        for (salinity, word, density) in [(Salinity::Fresh, "fresh", 1e-3), (Salinity::Sea, "sea", 0.06)] {
            let water = Water::at(salinity, celsius).expect("water");
            // Published to 1e-4; the sea's density is that of two atmospheres, by what the table's note says.
            assert!((water.density - number(&row[format!("{word}_rho")])).abs() < density);
            assert!((1e6 * water.viscosity - number(&row[format!("{word}_nu_e6")])).abs() < 1.5e-4);
            if let Some(vapour) = row.get(format!("{word}_pv_kPa")) {
                assert!((1e-3 * water.vapour_pressure / number(vapour) - 1.0).abs() < 2e-3);
            }
        }
    }
    // Between the columns that are kept: every degree of the sea's density.
    let column = &table["ittc_sea_density"];
    let mut worst: f64 = 0.0;
    for (celsius, density) in std::iter::zip(list(column, "T"), list(column, "surface_teos10")) {
        let water = Water::at(Salinity::Sea, celsius).expect("water");
        worst = worst.max((water.density - density).abs());
    }
    println!("density of the sea, every degree: within {worst:.4} kg/m³");
    assert!(worst < 2e-3, "{worst}");
    // Viscosity falls and vapour pressure rises all the way.
    for salinity in [Salinity::Fresh, Salinity::Sea] {
        let at = |celsius: f64| Water::at(salinity, celsius).expect("water");
        for i in 0..300 {
            let (a, b) = (at(0.1 * f64::from(i)), at(0.1 * f64::from(i + 1)));
            assert!(a.viscosity > b.viscosity && a.vapour_pressure < b.vapour_pressure);
        }
    }
    assert_eq!(Water::at(Salinity::Fresh, -0.1), None);
    assert_eq!(Water::at(Salinity::Sea, f64::NAN), None);
}

#[test]
fn water_boils_where_suction_reaches_the_cavitation_number() {
    let water = Water::at(Salinity::Sea, 15.0).expect("water");
    // By hand: (101325 + 1025.976 · 9.80665 · 0.5 − 1673.87)/(½ · 1025.976 · 10²) = 2.0406.
    let number = water.cavitation_number(0.5, 10.0);
    println!("sigma at 10 m/s, 0.5 m: {number:.4}");
    assert!((number - 2.0406).abs() < 1e-4);
    let speed = water.inception_speed(0.5, -number).expect("suction");
    assert!((speed - 10.0).abs() < 1e-9);
    assert_eq!(water.inception_speed(0.5, 0.2), None);
    assert_eq!(water.inception_speed(0.5, f64::NAN), None);
    assert!((water.reynolds(0.1, 5.0) - 0.5 / water.viscosity).abs() < 1e-6);
}
