//! What is told of the wood of a design: cut-outs that go wrong, hinges that bind, ends of the foil.

mod common;

use common::Bench;
use serde_json::Value;

const FOIL: &str = r#"name = "Trial"
kind = "main-foil"

[planform]
span = "600 mm"

[[station]]
at = "0 mm"
chord = "140 mm"
section = "NACA 2412"

[[station]]
at = "300 mm"
chord = "100 mm"
section = "NACA 2412"

[lift]
from = "0 deg"
to = "4 deg"
step = "2 deg"
design = 0.3
"#;

const STRUT: &str = r#"name = "Trial strut"
kind = "strut"

[planform]
span = "600 mm"

[[station]]
at = "0 mm"
chord = "100 mm"
section = "NACA 0012"

[[station]]
at = "600 mm"
chord = "100 mm"
section = "NACA 0012"

[lift]
from = "0 deg"
to = "4 deg"
step = "2 deg"
design = 0.2
"#;

/// The checks of a design of that name.
fn checks(text: &str, name: &str) -> Vec<Value> {
    let bench = Bench::new();
    bench.file("design.toml", text);
    let answer = bench.run(&["check", "design.toml", "--format", "json"]);
    assert!(answer.status <= 1, "{}", answer.err);
    let found = answer.json()["checks"].as_array().expect("checks").clone();
    found.into_iter().filter(|check| check["name"] == name).collect()
}

fn number(value: &Value) -> f64 {
    value.as_f64().expect("a number")
}

const CUT: &str = "wood is left beside the cut";

fn cut(words: &str) -> String {
    format!("\n[[cut]]\nfor = \"control rod\"\n{words}\n")
}

/// Each names where it is, what is wrong and a value that would work, which then does work.
#[test]
fn a_slot_that_breaks_through_is_told_what_depth_would_do() {
    for (kind, size, too_much) in [
        ("kind = \"slot\"\nat = 0.3\nwidth = \"8 mm\"", "depth", 14.0),
        ("kind = \"slot\"\nat = 0.3\nface = \"lower\"\nwidth = \"8 mm\"", "depth", 10.5),
        ("kind = \"bore\"\nat = 0.3", "width", 11.0),
        ("kind = \"pocket\"\nchord-from = 0.2\nchord-to = 0.5", "depth", 13.0),
        (
            "kind = \"slot\"\nalong = \"chord\"\nspan-at = \"50 mm\"\nchord-from = 0.2\nchord-to = 0.5\nwidth = \"6 mm\"",
            "depth",
            13.0,
        ),
    ] {
        let with = |mm: f64| STRUT.to_owned() + &cut(&format!("{kind}\n{size} = \"{mm} mm\""));
        let [check] = &checks(&with(too_much), CUT)[..] else { panic!("one check") };
        assert_eq!(check["passed"], false, "{check}");
        let why = check["why"].as_str().expect("words");
        assert!(check["where"].as_str().expect("words").contains("control rod"), "{check}");
        assert!(why.contains("too little wood") == (number(&check["value"]) > 0.0), "{why}");
        let (_, rest) = why
            .split_once(&format!("a {} of ", if size == "width" { "diameter" } else { "depth" }))
            .expect(why);
        let works: f64 = rest.split(' ').next().expect("a number").parse().expect("a number");
        assert!(works < too_much);
        let [check] = &checks(&with(works), CUT)[..] else { panic!("one check") };
        assert!(check["passed"] == true && number(&check["value"]) < 3.1, "{kind} {works}: {check}");
    }
}

#[test]
fn cut_outs_keep_away_from_the_hinge_and_from_each_other() {
    let flap = "\n[flap]\nhinge = 0.7\n";
    let near =
        FOIL.to_owned() + flap + &cut("kind = \"bore\"\nat = 0.68\nwidth = \"3 mm\"\nfrom = \"50 mm\"");
    let [check] = &checks(&near, CUT)[..] else { panic!("one check") };
    assert!(
        check["passed"] == false && check["why"].as_str().expect("words").contains("to the hinge"),
        "{check}"
    );
    let across = FOIL.to_owned()
        + flap
        + &cut("kind = \"pocket\"\nchord-from = 0.6\nchord-to = 0.75\ndepth = \"1 mm\"\nfrom = \"50 mm\"");
    let [check] = &checks(&across, CUT)[..] else { panic!("one check") };
    assert!(check["why"].as_str().expect("words").contains("runs into the hinge"), "{check}");

    let two = FOIL.to_owned()
        + &cut("kind = \"bore\"\nat = 0.3\nwidth = \"4 mm\"")
        + &cut("kind = \"slot\"\nat = 0.32\nwidth = \"4 mm\"\ndepth = \"6 mm\"")
            .replace("control rod", "spar");
    let found = checks(&two, CUT);
    assert!(
        found.iter().any(|check| check["passed"] == false && check["why"].as_str().unwrap().contains("spar")),
        "{found:?}"
    );
    // A bolt may go through the bottom of a pocket.
    let bolt = FOIL.to_owned()
        + &cut("kind = \"pocket\"\nchord-from = 0.2\nchord-to = 0.5\ndepth = \"2 mm\"\nto = \"40 mm\"")
        + &cut("kind = \"hole\"\nat = 0.3\nspan-at = \"20 mm\"\nwidth = \"6 mm\"");
    let found = checks(&bolt, CUT);
    assert!(found.len() == 2 && found.iter().all(|check| check["passed"] == true), "{found:?}");
}

/// A hinge at a fixed share of a chord that bends along the span is bent too; one at a length from a
/// straight trailing edge is not.
#[test]
fn a_bent_hinge_line_is_told() {
    let middle = "[[station]]\nat = \"150 mm\"\nchord = \"135 mm\"\nsection = \"NACA 2412\"\nsweep = \"SWEEP\"\n\n[[station]]\nat = \"300 mm\"";
    let bent = FOIL.replacen("[[station]]\nat = \"300 mm\"", middle, 1);
    let name = "the hinge line is straight";
    let flap = "\n[flap]\nhinge = 0.7\nclearance = \"0.5 mm\"\n";
    let [check] = &checks(&(bent.replace("SWEEP", "0 mm") + flap), name)[..] else { panic!("one check") };
    // At 70 % of chord the hinge lies 0.45 c behind the quarter chord: 6.75 mm too far aft in the middle.
    assert!(check["passed"] == false && (number(&check["value"]) - 0.45 * 15.0).abs() < 0.2, "{check}");
    assert_eq!(check["where"], "150 mm from the root");
    let [check] = &checks(&(bent.replace("SWEEP", "-6.75 mm") + flap), name)[..] else { panic!("one check") };
    // What is left is in height: the upper surface rises with the chord.
    assert!(number(&check["value"]) < 0.9, "{check}");
    let length = "\n[flap]\nhinge = \"40 mm\"\nhinge-end = \"30 mm\"\nhinge-from = \"trailing-edge\"\nkind = \"pin\"\n";
    let [check] = &checks(&(FOIL.to_owned() + length), name)[..] else { panic!("one check") };
    assert!(check["passed"] == true && number(&check["value"]) < 0.05, "{check}");
}

/// A hinge that leans carries the ends of its flap along the span.
#[test]
fn the_ends_of_a_flap_run_free() {
    let name = "the flap's ends run free";
    let flap = "\n[flap]\nhinge = 0.7\nfrom = \"50 mm\"\nto = \"250 mm\"\nclearance = \"0.5 mm\"\n";
    let with_rise = |rise: &str| {
        let (inner, outer) = FOIL.split_once("at = \"300 mm\"\n").expect("the outer station");
        format!("{inner}at = \"300 mm\"\nrise = \"{rise}\"\n{outer}{flap}")
    };
    let gap = |rise: &str| {
        let [check] = &checks(&with_rise(rise), name)[..] else { panic!("one check") };
        (number(&check["value"]), check["passed"] == true)
    };
    let (level, passed) = gap("0 mm");
    assert!(passed && level > 0.3 && level <= 0.5, "{level}");
    let (raised, passed) = gap("100 mm");
    assert!(!passed && raised < 0.0, "{raised}");
}

#[test]
fn a_skin_that_leaves_no_workable_wood_is_told() {
    let name = "the core is as thick as the shop can shape";
    let skinned = |thickness: &str| {
        format!(
            "{STRUT}\n[laminate]\nleast-wood = \"2 mm\"\n\n[[ply]]\nweight = \"300 g/m2\"\nthickness = \"{thickness}\"\n"
        )
    };
    // 12 % of 100 mm less two skins.
    for (thickness, left) in [("1 mm", 10.0), ("5.2 mm", 1.6)] {
        for check in checks(&skinned(thickness), name) {
            assert!((number(&check["value"]) - left).abs() < 0.02, "{check}");
            assert_eq!(check["passed"], left >= 2.0);
        }
    }
    let bench = Bench::new();
    bench.file("design.toml", &skinned("6.5 mm"));
    let answer = bench.run(&["check", "design.toml"]);
    assert!(
        answer.status == 2 && answer.err.contains("take up 13.00 mm where the section is 12.00 mm thick"),
        "{}",
        answer.err
    );
}

/// What is in the case and what is in the water stands on the sheet and the pattern.
#[test]
fn the_case_and_the_water_are_drawn_and_measured() {
    let bench = Bench::new();
    let text =
        STRUT.replace("span = \"600 mm\"", "span = \"600 mm\"\nin-case = \"200 mm\"\nwaterline = \"350 mm\"");
    bench.file("design.toml", &text);
    let answer = bench.run(&["build", "design.toml", "--out", "pack"]);
    assert!(answer.status <= 1, "{}", answer.err);
    let sheet = std::fs::read_to_string(bench.path().join("pack/sheet.html")).expect("a sheet");
    // 250 mm of a chord of 100 mm; round NACA 0012 it is 2.04 chords.
    assert!(sheet.contains("In the water: 250 mm from 350 mm on, 250 cm² seen from the side"), "the sheet");
    let skin =
        sheet.split("seen from the side, ").nth(1).expect("the skin").split(' ').next().expect("a number");
    assert!((skin.parse::<f64>().expect("a number") - 2.04 * 250.0).abs() < 2.5, "{skin}");
    let pattern =
        std::fs::read_to_string(bench.path().join("pack/print/trial-strut-planform.svg")).expect("a pattern");
    assert!(pattern.contains("case ends, 200 mm") && pattern.contains("waterline, 350 mm"));
}
