//! The boat on its two foils: statics by hand, what is refused, and the three demos as one boat.

mod common;

use common::{Bench, demo};
use plankform::design::{Design, DesignErrors};
use plankform::section::Beside;

fn read(text: &str) -> Result<Design, DesignErrors> {
    let beside = |name: &str, _: usize| std::fs::read(demo(name));
    Design::parse_beside(text, "boat.toml", &Beside::new(&beside))
}

/// The demo's foil without the other foil's file, so that only the statics are read.
fn main_foil() -> String {
    std::fs::read_to_string(demo("main-foil.toml")).expect("a demo")
}

/// A seesaw that can be done in the head: 100 kg a quarter of the way from the forward foil to the after one.
fn seesaw(more: &str) -> String {
    let text = main_foil();
    let (head, rest) = text.split_once("[boat]").expect("a boat");
    let (_, tail) = rest.split_once("[masks]").expect("what follows");
    format!(
        "{head}[boat]\nfoil-at = \"1000 mm\"\nother-at = \"3000 mm\"\n{more}\n\
         [[weight]]\nfor = \"all\"\nmass = \"100 kg\"\naft = \"1500 mm\"\n[masks]{tail}"
    )
}

#[test]
fn shares_are_those_of_statics_by_hand() {
    let carries = |more: &str| read(&seesaw(more)).expect(more).boat.expect("a boat").carries;
    let near = |found: [f64; 2], expected: [f64; 2]| {
        assert!((found[0] - expected[0]).abs() < 1e-9 && (found[1] - expected[1]).abs() < 1e-9, "{found:?}");
    };
    near(carries(""), [75.0, 25.0]);
    // 98.0665 N pull 1 m above the drag: 98.0665 N m over 2 m are 49.03 N, or 5 kg, off the after foil.
    near(carries("drive = \"98.0665 N\"\neffort-height = \"1 m\""), [80.0, 20.0]);
    // The describing foil may be the after one.
    let swapped = seesaw("").replace("\"1000 mm\"", "\"X\"").replace("\"3000 mm\"", "\"1000 mm\"");
    let swapped = swapped.replace("foil-at = \"X\"", "foil-at = \"3000 mm\"");
    near(read(&swapped).expect("swapped").boat.expect("a boat").carries, [25.0, 75.0]);
    let design = read(&seesaw("")).expect("a design");
    assert!((design.duty.expect("a duty").carries - 75.0).abs() < 1e-9, "the duty follows from the balance");
    // Nose-up moments of the foils' own: 2 m times 98.0665 N are 196.133 N m, for 10 kg on the after foil.
    let shares = design.boat.expect("a boat").shares(196.133).expect("shares");
    near(shares, [65.0, 35.0]);
}

#[test]
fn a_boat_that_cannot_be_is_refused_where_it_stands() {
    let problem = |text: &str, says: &str| {
        let errors = read(text).expect_err(says);
        assert!(errors.problems().iter().any(|problem| problem.message.contains(says)), "{says}: {errors}");
    };
    problem(
        &seesaw("mass = \"120 kg\""),
        "the weights do not add up to the mass of the boat: 100.0 kg against 120.0 kg",
    );
    problem(&seesaw("other-carries = \"60 kg\""), "the other foil's share is not that of the balance");
    problem(
        &seesaw("").replace("aft = \"1500 mm\"", "aft = \"3500 mm\""),
        "the forward foil would have to pull down",
    );
    problem(&seesaw("").replace("other-at = \"3000 mm\"", ""), "does not say where both lie");
    problem(&seesaw("").replace("other-at = \"3000 mm\"", "other-at = \"1000 mm\""), "they must lie apart");
    problem(
        &seesaw("heel = \"45 deg\"\n").replace("450 mm\"\ntop-speed", "300 mm\"\ntop-speed"),
        "the foil comes out of the water",
    );
    problem(&seesaw("other-foil = \"nowhere.toml\""), "cannot be read");
    problem(&seesaw("other-foil = \"sections/scow-section.toml\""), "scow-section.toml, line");
    let text = main_foil();
    let given = |shares: &str| {
        let (head, rest) = text.split_once("[boat]").expect("a boat");
        let (_, tail) = rest.split_once("[masks]").expect("what follows");
        format!(
            "{}[boat]\n{shares}\n[masks]{tail}",
            head.replace("[duty]\n", "[duty]\ncarries = \"165 kg\"\n")
        )
    };
    assert!(read(&given("mass = \"205 kg\"\nother-carries = \"40 kg\"")).is_ok());
    problem(
        &given("mass = \"205 kg\"\nother-carries = \"60 kg\""),
        "the shares do not add up to the mass of the boat",
    );
    problem(&given("mass = \"205 kg\""), "neither weights nor shares");
    problem(&text.replace("cruise = \"14 kn\"", "cruise = \"21 kn\""), "cruise lies above top-speed");
    let strut = std::fs::read_to_string(demo("strut.toml")).expect("a demo");
    problem(
        &strut.replace("described-in = \"main-foil.toml\"", ""),
        "a boat is described in the design of a foil",
    );
    problem(&strut.replace("main-foil.toml", "elevator.toml"), "describes no boat");
    problem(&strut.replace("main-foil.toml\"", "main-foil.toml\"\nmass = \"9 kg\""), "and mass stands there");
}

#[test]
fn the_demos_are_one_boat() {
    let bench = Bench::new();
    let answer = |name: &str| {
        let path = demo(name);
        let answer = bench.run(&["check", path.to_str().expect("a path"), "--format", "json"]);
        assert_eq!(answer.status, 0, "{name}: {}{}", answer.out, answer.err);
        answer.json()["checks"].as_array().expect("checks").clone()
    };
    let main = answer("main-foil.toml");
    let named = |checks: &[serde_json::Value], name: &str| {
        checks.iter().filter(|check| check["name"] == name).count()
    };
    for name in [
        "the flap holds the boat level",
        "no part of the foil stalls",
        "the foil does not cavitate",
        "the boat balances on both foils",
    ] {
        assert_eq!(named(&main, name), 3, "{name} at take-off, cruise and top speed");
    }
    let elevator = answer("elevator.toml");
    assert_eq!(named(&elevator, "the boat balances on both foils"), 3);
    let strut = answer("strut.toml");
    assert!(strut.iter().any(|check| {
        check["where"].as_str().is_some_and(|place| place.contains("flight under the boat"))
    }));
    // What the main foil leaves is what the elevator carries.
    let limit = |checks: &[serde_json::Value]| {
        let carries = checks.iter().find(|check| check["name"] == "the foil carries its load at take-off");
        carries.expect("the check")["limit"].as_f64().expect("a number")
    };
    let weight = 205.0 * 9.80665 / 6.0_f64.to_radians().cos();
    assert!((limit(&main) + limit(&elevator) - weight).abs() < 0.01, "both foils carry the boat");
}

#[test]
fn a_load_that_no_flap_and_no_incidence_carries_is_told_with_the_most_it_could() {
    let bench = Bench::new();
    let heavy = seesaw("").replace("mass = \"100 kg\"", "mass = \"900 kg\"");
    bench.file("heavy.toml", &heavy);
    let answer = bench.run(&["check", "heavy.toml", "--format", "json"]);
    assert_eq!(answer.status, 1, "{}", answer.err);
    let checks = answer.json()["checks"].as_array().expect("checks").clone();
    let says = |name: &str| {
        let check = checks.iter().find(|check| check["name"] == name && check["passed"] == false);
        check.unwrap_or_else(|| panic!("{name}"))["why"].as_str().expect("why").to_owned()
    };
    assert!(says("the flap holds the boat level").contains("the most it could carry is"));
    assert!(says("no part of the foil stalls").contains("the most it could carry is"));
    assert!(says("the foil carries its load at take-off").contains("take more area"));
}
