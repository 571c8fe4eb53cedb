//! The page on what was compared with the world, and how close it came: `docs/validation.md`.
//!
//! Every figure on it is measured here; the test fails where the committed page says anything else.
//! `PLANKFORM_HANDBOOK=write cargo test --test validation` writes page and pictures anew.

// Printing what was measured is part of the purpose here.
#![allow(clippy::print_stdout)]

#[path = "../common/air.rs"]
mod air;
mod flow;
#[path = "../common/karman_trefftz.rs"]
mod karman_trefftz;
mod measured;
mod page;
mod pressure;
mod shape;
mod structure;

use page::{Part, alike};
use plankform::flow::side_by_side;
use std::path::Path;

/// What is compared, in the order of the page.
const PARTS: [fn() -> Part; 13] = [
    shape::sections,
    flow::exact_sections,
    flow::closed_sections,
    flow::cavitation,
    flow::layers,
    measured::tripped_0012,
    measured::low_reynolds,
    measured::report_824,
    pressure::gregory,
    pressure::flap,
    structure::lifting_line,
    shape::shop,
    structure::strength,
];

#[test]
fn the_page_says_what_is_measured() {
    let parts = side_by_side(&PARTS, |part| part(), |_| ());
    let page = page::page(&parts);
    let root = Path::new(env!("CARGO_MANIFEST_DIR"));
    let pictures = parts.iter().flat_map(|part| &part.pictures);
    let mut files = vec![(root.join("docs/validation.md"), page)];
    files.extend(pictures.map(|picture| (root.join(picture.path()), format!("{}\n", picture.svg))));
    let writes = std::env::var_os("PLANKFORM_HANDBOOK").is_some_and(|word| word == "write");
    for (path, text) in files {
        if writes {
            std::fs::write(&path, &text).expect("a written file");
        }
        let kept = std::fs::read_to_string(&path).unwrap_or_default();
        let found = alike(&kept, &text);
        assert!(
            found.is_ok(),
            "{} says otherwise than what is measured: {}. Write it anew as the head of this test says",
            path.display(),
            found.err().unwrap_or_default()
        );
    }
}

/// A value of a reference table.
fn number(value: &toml::Value) -> f64 {
    value.as_float().or_else(|| value.as_integer().map(|i| i as f64)).expect("a number")
}

fn numbers(value: &toml::Value) -> Vec<f64> {
    value.as_array().expect("a list").iter().map(number).collect()
}

/// Rows of a reference table.
fn rows(table: &toml::Value) -> Vec<Vec<f64>> {
    table["rows"].as_array().expect("rows").iter().map(numbers).collect()
}

fn parsed(text: &str) -> toml::Table {
    text.parse().expect("a reference table")
}

/// Greatest amount of some differences.
fn greatest(values: impl IntoIterator<Item = f64>) -> f64 {
    values.into_iter().fold(0.0, |most, value| most.max(value.abs()))
}
