//! The hand-book's page on sections: its examples are read, its pictures are what the tool draws.
//!
//! `PLANKFORM_PICTURES=write cargo test --test handbook_sections` draws the pictures anew.

mod common;

use common::Bench;
use plankform::section::{Beside, Section};

const PAGE: &str = include_str!("../docs/sections.md");

/// The section files that the page shows, in order.
fn examples() -> Vec<&'static str> {
    PAGE.split("```toml\n").skip(1).filter_map(|rest| rest.split("```").next()).collect()
}

/// The example of that name.
fn example(name: &str) -> &'static str {
    let line = format!("name = \"{name}\"");
    examples().into_iter().find(|text| text.starts_with(&line)).unwrap_or_else(|| panic!("no example {name}"))
}

#[test]
fn every_example_is_a_section() {
    let demo = |name: &str, _most: usize| std::fs::read(common::demo(&format!("sections/{name}")));
    assert!(examples().len() >= 7);
    for text in examples() {
        let files = |name: &str, most: usize| {
            if name == "example.toml" { Ok(text.as_bytes().to_vec()) } else { demo(name, most) }
        };
        let section = Beside::new(&files)
            .section("example.toml")
            .unwrap_or_else(|error| panic!("{}", error.render(false)));
        assert!(section.numbers().area > 0.01);
    }
    let flat = Section::from_file_text(example("Flat-backed foil"), "example.toml").expect("a section");
    let said = format!("thickness of {:.2} %", 100.0 * flat.numbers().thickness);
    assert!(PAGE.contains(&said), "the page does not say {said}");
}

#[test]
fn pictures_are_what_the_tool_draws() {
    let bench = Bench::new();
    for (picture, section) in [
        ("four-digit", "NACA 2412"),
        ("five-digit", "NACA 23012"),
        ("five-digit-reflexed", "NACA 23112"),
        ("modified", "NACA 0012-34"),
        ("16-series", "NACA 16-209"),
        ("equations", "Flat-backed foil"),
        ("surfaces", "Flat-bottomed"),
        ("coordinates", "Rudder from the shed wall"),
        ("worked", "Thinner, and an edge that can be glassed"),
        ("flap", "Flap ten degrees down"),
    ] {
        let named = if section.starts_with("NACA") {
            section
        } else {
            bench.file("example.toml", example(section));
            let points = std::fs::read_to_string(common::demo("sections/old-rudder.txt")).expect("points");
            bench.file("old-rudder.txt", &points);
            "example.toml"
        };
        let answer = bench.run(&["section", named, "--chord", "160 mm", "--svg", "picture.svg"]);
        assert_eq!(answer.status, 0, "{}", answer.err);
        let drawn = std::fs::read_to_string(bench.path().join("picture.svg")).expect("a picture");
        let kept = format!("{}/docs/pictures/sections/{picture}.svg", env!("CARGO_MANIFEST_DIR"));
        assert!(PAGE.contains(&format!("pictures/sections/{picture}.svg")), "{picture} is not on the page");
        if std::env::var_os("PLANKFORM_PICTURES").is_some_and(|word| word == "write") {
            std::fs::write(&kept, &drawn).expect("a written picture");
        }
        let kept = std::fs::read_to_string(&kept).unwrap_or_default();
        assert!(
            common::alike(&kept, &drawn),
            "{picture} is stale: draw it anew as the head of this file says"
        );
    }
}
