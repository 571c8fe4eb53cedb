//! The hand-book's page on wood, laminate and flap: its pictures are what the tool draws.
//!
//! `PLANKFORM_PICTURES=write cargo test --test handbook_parts` draws the pictures anew.

mod common;

use common::Bench;

const PAGE: &str = include_str!("../docs/parts.md");

/// The build sheet of a design file.
fn sheet(path: &str) -> String {
    let bench = Bench::new();
    let answer = bench.run(&["build", path, "--out", "pack", "--only", "sheet"]);
    assert!(answer.status <= 1, "{}", answer.err);
    std::fs::read_to_string(bench.path().join("pack/sheet.html")).expect("a sheet")
}

/// The picture above a caption that begins so.
fn picture<'a>(sheet: &'a str, caption: &str) -> &'a str {
    let end =
        sheet.find(&format!("<figcaption>{caption}")).unwrap_or_else(|| panic!("no picture of {caption}"));
    let start = sheet[..end].rfind("<svg").expect("a picture");
    &sheet[start..end]
}

#[test]
fn pictures_are_what_the_tool_draws() {
    let bench = Bench::new();
    let [example] =
        &PAGE.split("```toml\n").skip(1).filter_map(|rest| rest.split("```").next()).collect::<Vec<_>>()[..]
    else {
        panic!("one example")
    };
    let curved = bench.file("curved.toml", example);
    let demo = |name: &str| sheet(common::demo(name).to_str().expect("a path"));
    let (foil, strut, elevator) = (demo("main-foil.toml"), demo("strut.toml"), demo("elevator.toml"));
    let curved = sheet(curved.to_str().expect("a path"));
    for (name, sheet, caption) in [
        ("planform", &foil, "Planform"),
        ("core", &foil, "Station 0 mm from the root, core template"),
        ("main-body", &foil, "Station 112.5 mm from the root, main body template"),
        ("laminate-hinge", &foil, "Flap at station 112.5 mm"),
        ("pin-hinge", &elevator, "Flap at station 125 mm"),
        ("strut", &strut, "Planform"),
        ("cut-outs", &strut, "Station 850 mm from the root, core template"),
        ("curved", &curved, "Planform"),
    ] {
        let drawn = picture(sheet, caption);
        let kept = format!("{}/docs/pictures/parts/{name}.svg", env!("CARGO_MANIFEST_DIR"));
        assert!(PAGE.contains(&format!("pictures/parts/{name}.svg")), "{name} is not on the page");
        if std::env::var_os("PLANKFORM_PICTURES").is_some_and(|word| word == "write") {
            std::fs::write(&kept, format!("{drawn}\n")).expect("a written picture");
        }
        let kept = std::fs::read_to_string(&kept).unwrap_or_default();
        assert!(
            common::alike(kept.trim_end(), drawn),
            "{name} is stale: draw it anew as the head of this file says"
        );
    }
}
