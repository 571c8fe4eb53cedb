//! Strength of whole designs: what a design says of its materials and loads, and what comes of it.

mod common;

use common::{Bench, demo};
use plankform::design::Design;
use plankform::geometry::{Point, polygon};
use plankform::strength::{BeamNode, bond_shear};
use std::f64::consts::{PI, TAU};

/// A demo by itself, without the boat that another file describes.
fn text_of(name: &str) -> String {
    let text = std::fs::read_to_string(demo(name)).expect("a demo");
    text.replace("[boat]\ndescribed-in = \"main-foil.toml\"\n", "")
}

fn checks(bench: &Bench, text: &str) -> Vec<serde_json::Value> {
    bench.file("design.toml", text);
    let answer = bench.run(&["check", "design.toml", "--format", "json"]);
    answer.json()["checks"].as_array().expect("checks").clone()
}

fn of_strength(checks: &[serde_json::Value]) -> Vec<&serde_json::Value> {
    checks.iter().filter(|check| check["name"] == "it does not break").collect()
}

/// The number that stands after some words.
fn after(text: &str, words: &str) -> f64 {
    let rest = text.split_once(words).unwrap_or_else(|| panic!("{words} in {text}")).1;
    rest.split(' ').next().expect("a word").parse().expect("a number")
}

#[test]
fn a_strut_that_breaks_says_which_ply_mends_it_and_with_that_it_holds() {
    let bench = Bench::new();
    let text = text_of("strut-too-thin.toml");
    let before = checks(&bench, &text);
    let failing: Vec<_> =
        of_strength(&before).into_iter().filter(|check| check["passed"] == false).cloned().collect();
    assert!(!failing.is_empty());
    let worst = &failing[0];
    assert!(worst["where"].as_str().expect("a place").starts_with("300 mm from the root"), "{worst}");
    let why = worst["why"].as_str().expect("why");
    assert!(why.contains("not a certification") && why.contains("were not tested"), "{why}");
    let count = after(why, "along its fibre: ");
    let (weight, from, to) =
        (after(why, "carbon, along the span "), after(why, "chord, from "), after(why, " to "));
    let ply = format!(
        "[[ply]]\ncloth = \"more\"\nmaterial = \"carbon, along the span\"\nfibre-share = 0.5\n\
         weight = \"{weight} g/m2\"\nfrom = \"{from} mm\"\nto = \"{to} mm\"\n"
    );
    let after = checks(&bench, &format!("{text}\n{}", ply.repeat(count as usize)));
    for check in of_strength(&after) {
        assert_eq!(check["passed"], true, "{check}");
    }
    // One ply fewer does not do.
    let fewer = checks(&bench, &format!("{text}\n{}", ply.repeat(count as usize - 1)));
    assert!(of_strength(&fewer).iter().any(|check| check["passed"] == false));
}

#[test]
fn without_materials_nothing_is_said_and_the_sheet_says_that() {
    let bench = Bench::new();
    bench.file("design.toml", common::DESIGN);
    assert!(of_strength(&checks(&bench, common::DESIGN)).is_empty());
    assert_eq!(bench.run(&["build", "design.toml", "--out", "pack"]).status, 0);
    let sheet = std::fs::read_to_string(bench.path().join("pack/sheet.html")).expect("a sheet");
    assert!(sheet.contains("Nothing is known of the strength of this part"));
    assert!(!bench.path().join("pack/tables/strength.csv").exists());
}

#[test]
fn half_of_the_values_is_refused_with_what_is_missing() {
    let strut = text_of("strut.toml");
    let problem = |text: &str, says: &str| {
        let error = Design::parse(text, "strut.toml").expect_err(says);
        let found = error.problems().iter().any(|problem| problem.message.contains(says));
        assert!(found, "{says}: {error}");
    };
    problem(&strut.replace("modulus = \"7 GPa\" ", "#"), "[wood] lacks modulus for its strength");
    problem(&strut.replacen("material = \"carbon twill\"", "", 1), "this ply names no material");
    problem(
        &strut.replacen("material = \"carbon twill\"", "material = \"carbon twil\"", 1),
        "no [[material]] named",
    );
    problem(&strut.replace("modulus-across = \"7.5 GPa\"", ""), "needs modulus-across");
    problem(&strut.replace("off = \"25 deg\"", ""), "a case of tow needs off");
    problem(
        &strut.replace("off = \"25 deg\"", "off = \"25 deg\"\nmass = \"3 kg\""),
        "a case of tow takes no mass",
    );
    problem(&strut.replace("[strength]\n", "[strength]\nheld-to = \"850 mm\"\n"), "nothing is left free");
    problem(&strut.replace("at = \"800 mm\"", "at = \"200 mm\""), "it is held");
    problem(&strut.replace("to = \"810 mm\"", "to = \"900 mm\""), "lies at 900 mm");
    problem(&strut.replace("contraction", "").replace("modulus = \"52 GPa\"", "modulus = \"52\""), "unit");
    assert!(Design::parse(&strut, "strut.toml").is_ok());
}

/// Weight of the strut from its sections against wood by volume and cloth by area, each worked out apart.
#[test]
fn sections_weigh_as_much_as_wood_and_laminate() {
    let bench = Bench::new();
    // No cuts, which the list of pieces leaves in; all of it free.
    let text = text_of("strut.toml");
    let cut = |text: &str, from: &str, to: &str| {
        let (head, rest) = text.split_once(from).expect("there");
        format!("{head}{to}{}", rest.split_once(to).expect("there").1)
    };
    let text = cut(&text, "# The rod that works", "# INVENTED values");
    let text = text.replace("[strength]\n", "[strength]\nheld-to = \"0 mm\"\n");
    bench.file("design.toml", &text);
    let answer = bench.run(&["build", "design.toml", "--out", "pack", "--only", "tables"]);
    assert!(answer.status < 2, "{}", answer.err);
    let table = std::fs::read_to_string(bench.path().join("pack/tables/strength.csv")).expect("a table");
    let mut rows = csv::Reader::from_reader(table.as_bytes());
    let column = |name: &str| rows_index(&table, name);
    let (place, mass) = (column("station_mm"), column("mass_kg_per_m"));
    let rows: Vec<(String, f64, f64)> = rows
        .records()
        .map(|row| row.expect("a row"))
        .map(|row| (row[0].to_owned(), row[place].parse().expect("mm"), row[mass].parse().expect("kg/m")))
        .collect();
    let first: Vec<_> = rows.iter().filter(|row| row.0 == rows[0].0).collect();
    let found: f64 =
        first.windows(2).map(|pair| 0.5e-3 * (pair[1].1 - pair[0].1) * (pair[0].2 + pair[1].2)).sum();

    let design = Design::parse(&text, "design.toml").expect("a design");
    let wing = design.wing().expect("a wing");
    let pieces = design.pieces(&wing).expect("pieces");
    let wood: f64 = pieces.iter().map(|piece| piece.volume * 1e-9 * design.wood.density).sum();
    // Round the section once: length of the outline from its points, a share of it where the ply ends.
    let outline: Vec<Point> = design.stations[0].section.points(2001).into_iter().collect();
    let round = |from: f64, to: f64| -> f64 {
        let within = |p: &Point| (from..=to).contains(&p.x);
        let sides = outline.windows(2).filter(|pair| within(&pair[0]) && within(&pair[1]));
        sides.map(|pair| pair[0].distance(pair[1])).sum::<f64>() * 110.0
    };
    let thickness = |ply: &plankform::design::Ply| ply.weight / (ply.fibre_density * ply.fibre_share);
    let cloth = |(i, ply): (usize, &plankform::design::Ply)| {
        let density = ply.fibre_share * ply.fibre_density + (1.0 - ply.fibre_share) * ply.resin_density;
        let over: f64 = design.plies[i + 1..].iter().map(thickness).sum();
        let depth = 0.1 + over + 0.5 * thickness(ply);
        // A ply that goes all round is shorter by 2 π times its depth, as any closed curve is.
        let shorter = if ply.chord_from == 0.0 { TAU * depth } else { 0.0 };
        let length = ply.to.mm() - ply.from.mm();
        (round(ply.chord_from, ply.chord_to) - shorter) * length * thickness(ply) * density * 1e-9
    };
    let cloth: f64 = design.plies.iter().enumerate().map(cloth).sum();
    let expected = wood + cloth;
    let off = (found - expected).abs() / expected;
    println!("weight {found:.4} kg, wood {wood:.4} and cloth {cloth:.4} kg, off by {off:.1e}");
    // The recess for a ply rises over 5 mm on the wood's templates and in a step here, and both skins share the room
    // behind the end of the wood.
    assert!(off < 0.01, "{found} against {expected}");
}

fn rows_index(table: &str, name: &str) -> usize {
    let head = table.lines().next().expect("a heading");
    head.split(',').position(|column| column == name).expect("the column")
}

/// A round pin of radius R glued in h deep: M/(π R² h) from bending, T/(2 π R² h) from torque, N/(2 π R h)
/// from a push; by hand from ∮ y² ds = π R³.
#[test]
fn the_glue_of_a_round_pin_shears_as_by_hand() {
    let (radius, depth, corners) = (12.0, 40.0, 720);
    let circle: Vec<Point> = (0..corners)
        .map(|i| TAU * f64::from(i) / f64::from(corners))
        .map(|angle| Point::new(70.0 + radius * angle.cos(), radius * angle.sin()))
        .collect();
    assert!(polygon::area(&circle) > 0.0);
    let base = BeamNode::default();
    let nodes = [
        (BeamNode { moment: [9e4, 0.0], ..base }, 9e4 / (PI * radius * radius * depth)),
        (BeamNode { moment: [0.0, -9e4], ..base }, 9e4 / (PI * radius * radius * depth)),
        (BeamNode { torque: 5e4, ..base }, 5e4 / (2.0 * PI * radius * radius * depth)),
        (BeamNode { compression: 800.0, ..base }, 800.0 / (2.0 * PI * radius * depth)),
        (BeamNode { shear: [300.0, 400.0], ..base }, 500.0 / (2.0 * PI * radius * depth)),
    ];
    for (node, expected) in nodes {
        let found = bond_shear(&circle, depth, &node).expect("a stress");
        assert!((found / expected - 1.0).abs() < 3e-5, "{found} against {expected}");
    }
    assert!(bond_shear(&circle, 0.0, &base).is_err() && bond_shear(&circle[..2], 5.0, &base).is_err());
}
