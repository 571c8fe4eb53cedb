//! The pack: whole or not at all, the same every time, and nobody else's files touched.

mod common;

use std::collections::BTreeMap;
use std::fs;
use std::path::Path;

use common::{Bench, DESIGN, demo};
use sha2::{Digest, Sha256};

fn contents(folder: &Path) -> BTreeMap<String, Vec<u8>> {
    fn walk(folder: &Path, root: &Path, found: &mut BTreeMap<String, Vec<u8>>) {
        for entry in fs::read_dir(folder).expect("a folder") {
            let path = entry.expect("an entry").path();
            if path.is_dir() {
                walk(&path, root, found);
            } else {
                let name = path.strip_prefix(root).expect("inside").display().to_string();
                found.insert(name, fs::read(&path).expect("a file"));
            }
        }
    }
    let mut found = BTreeMap::new();
    walk(folder, folder, &mut found);
    found
}

#[test]
fn every_demo_builds_a_complete_pack() {
    for name in ["main-foil", "elevator", "strut"] {
        let bench = Bench::new();
        let design = demo(&format!("{name}.toml"));
        let design = design.to_str().expect("a path");
        let answer = bench.run(&["build", design, "--out", "pack", "--format", "json"]);
        assert_eq!(answer.status, 0, "{name}: {}", answer.err);
        let json = answer.json();
        assert_eq!(json["passed"], true);
        assert_eq!(json["out"], "pack");

        let files = contents(&bench.path().join("pack"));
        let listed = json["files"].as_array().expect("files");
        assert_eq!(listed.len() + 1, files.len(), "{name}: pack.json lists all files but itself");
        for entry in listed {
            let path = entry["path"].as_str().expect("a path");
            let digest: String = Sha256::digest(&files[path]).iter().map(|b| format!("{b:02x}")).collect();
            assert_eq!(entry["sha256"], digest.as_str(), "{path}");
            assert!(!files[path].is_empty(), "{path}");
        }
        let count = |ending: &str| files.keys().filter(|f| f.ends_with(ending)).count();
        let wood = ["-core.dxf", "-main.dxf", "-flap.dxf"].into_iter().map(count).sum::<usize>();
        let sheets_of_stock =
            files.keys().filter(|f| f.contains("-sheet-") && !f.ends_with("-r12.dxf")).count();
        assert!(sheets_of_stock >= 1, "{name}");
        let stations = count(".dxf") - count("-r12.dxf") - 1 - wood - sheets_of_stock;
        assert!(stations >= 2, "{name}");
        let sheets = 1 + usize::from(wood > 0);
        assert_eq!(
            (count(".svg"), count(".pdf"), count(".stl")),
            (stations + wood + 1, sheets, 2 * stations + count("-core-upper.stl") + count("-core-lower.stl")),
            "{name}"
        );
        assert_eq!(count("-core-upper.stl"), count("-core-lower.stl"), "{name}");
        for file in ["sheet.html", "tables/offsets.csv", "pack.json"] {
            assert!(files.contains_key(file), "{file}");
        }
        // The manifest on disk is what was printed, but for the folder, which may be moved.
        let mut manifest: serde_json::Value = serde_json::from_slice(&files["pack.json"]).expect("JSON");
        assert_eq!(manifest["out"], ".");
        manifest["out"] = json["out"].clone();
        assert_eq!(manifest, json);
    }
}

#[test]
fn packs_are_the_same_byte_for_byte() {
    let bench = Bench::new();
    let design = demo("main-foil.toml");
    let design = design.to_str().expect("a path");
    for out in ["one", "two"] {
        assert_eq!(bench.run(&["build", design, "--out", out]).status, 0);
    }
    assert_eq!(bench.run(&["build", design, "--out", "one"]).status, 0, "built over itself");
    assert_eq!(contents(&bench.path().join("one")), contents(&bench.path().join("two")));
}

#[test]
fn only_makes_the_kinds_asked_for() {
    let bench = Bench::new();
    bench.file("foil.toml", DESIGN);
    assert_eq!(bench.run(&["build", "foil.toml", "--only", "cut,tables"]).status, 0);
    let files = contents(&bench.path().join("pack-trial-foil"));
    assert!(files.keys().all(|f| f.starts_with("cut/") || f.starts_with("tables/") || f == "pack.json"));
    assert_eq!(bench.run(&["build", "foil.toml", "--only", "soup"]).status, 2);
}

#[test]
fn a_new_pack_replaces_the_old_one_and_keeps_the_users_files() {
    let bench = Bench::new();
    bench.file("foil.toml", &format!("{DESIGN}[templates]\nat = [\"0 mm\", \"100 mm\", \"200 mm\"]\n"));
    assert_eq!(bench.run(&["build", "foil.toml", "--out", "pack"]).status, 0);
    bench.file("pack/notes.txt", "sanded the nose");
    fs::create_dir(bench.path().join("pack/photos")).expect("a folder");
    bench.file("pack/photos/one.jpg", "a photo");
    bench.file("pack/cut/my.dxf", "mine");
    assert!(bench.path().join("pack/cut/trial-foil-station-100.dxf").exists());

    bench.file("foil.toml", DESIGN);
    let answer = bench.run(&["build", "foil.toml", "--out", "pack"]);
    assert_eq!(answer.status, 0, "{}", answer.err);
    assert!(!bench.path().join("pack/cut/trial-foil-station-100.dxf").exists(), "the old station is gone");
    for (file, text) in
        [("notes.txt", "sanded the nose"), ("photos/one.jpg", "a photo"), ("cut/my.dxf", "mine")]
    {
        assert_eq!(fs::read_to_string(bench.path().join("pack").join(file)).expect("kept"), text);
    }
    let outside = bench.listing().into_iter().filter(|f| !f.starts_with("pack")).collect::<Vec<_>>();
    assert_eq!(outside, ["foil.toml"], "nothing is left beside the pack");
}

#[test]
fn places_that_are_not_for_a_pack_are_left_alone() {
    let bench = Bench::new();
    bench.file("foil.toml", DESIGN);
    bench.file("a-file", "mine");
    fs::create_dir(bench.path().join("full")).expect("a folder");
    bench.file("full/mine.txt", "mine");
    for (out, says) in [
        ("a-file", "is a file"),
        ("a-file/inside", "is a file"),
        ("full", "not empty"),
        (".", "stand in"),
        ("..", "stand in"),
        ("/", "stand in"),
    ] {
        let before = contents(bench.path());
        let answer = bench.run(&["build", "foil.toml", "--out", out]);
        assert_eq!(answer.status, 2, "{out}: {}", answer.err);
        assert!(answer.err.contains(says), "{out}: {}", answer.err);
        assert_eq!(contents(bench.path()), before, "{out}");
    }
    // The pack of another design is not ours to replace either.
    assert_eq!(bench.run(&["build", "foil.toml", "--out", "pack"]).status, 0);
    let before = contents(&bench.path().join("pack"));
    bench.file("other.toml", &DESIGN.replace("Trial foil", "Other foil"));
    assert_eq!(bench.run(&["build", "other.toml", "--out", "pack"]).status, 2);
    assert_eq!(contents(&bench.path().join("pack")), before);
}

#[test]
fn a_file_worked_on_by_hand_is_not_overwritten() {
    let bench = Bench::new();
    bench.file("foil.toml", DESIGN);
    assert_eq!(bench.run(&["build", "foil.toml", "--out", "pack"]).status, 0);
    bench.file("pack/cut/trial-foil-planform.dxf", "my own changes");
    let answer = bench.run(&["build", "foil.toml", "--out", "pack"]);
    assert_eq!(answer.status, 2);
    assert!(answer.err.contains("was changed since"), "{}", answer.err);
    let kept = fs::read_to_string(bench.path().join("pack/cut/trial-foil-planform.dxf")).expect("kept");
    assert_eq!(kept, "my own changes");
    // A file of ours that is gone is no reason to stop.
    fs::remove_file(bench.path().join("pack/cut/trial-foil-planform.dxf")).expect("removed");
    assert_eq!(bench.run(&["build", "foil.toml", "--out", "pack"]).status, 0);
}

#[test]
fn a_manifest_that_points_outside_is_not_believed() {
    let bench = Bench::new();
    bench.file("foil.toml", DESIGN);
    fs::create_dir(bench.path().join("pack")).expect("a folder");
    let manifest = r#"{"design": "Trial foil", "fingerprint": "", "passed": true, "out": ".", "files": [
        {"path": "../foil.toml", "kind": "", "role": "", "station_mm": null, "sha256": ""}]}"#;
    bench.file("pack/pack.json", manifest);
    assert_eq!(bench.run(&["build", "foil.toml", "--out", "pack"]).status, 2);
    assert_eq!(fs::read_to_string(bench.path().join("foil.toml")).expect("there"), DESIGN);
}

/// A limit on the size of files stands in for a full disk: the system refuses the write half-way.
#[cfg(unix)]
#[test]
fn a_full_disk_leaves_the_earlier_pack_as_it_was() {
    let bench = Bench::new();
    bench.file("foil.toml", DESIGN);
    assert_eq!(bench.run(&["build", "foil.toml", "--out", "pack"]).status, 0);
    let before = contents(bench.path());
    let script = format!(
        "trap '' XFSZ; ulimit -f 8; exec '{}' build foil.toml --out pack",
        env!("CARGO_BIN_EXE_plankform")
    );
    let output = std::process::Command::new("bash")
        .args(["-c", &script])
        .current_dir(bench.path())
        .output()
        .expect("a shell");
    let err = String::from_utf8_lossy(&output.stderr);
    assert_eq!(output.status.code(), Some(3), "{err}");
    assert!(err.contains("cannot write"), "{err}");
    assert_eq!(contents(bench.path()), before);
}

/// Root may write where others may not, so this asks the one place that refuses everybody.
#[cfg(target_os = "linux")]
#[test]
fn an_unwritable_place_is_a_failure_to_write() {
    let bench = Bench::new();
    bench.file("foil.toml", DESIGN);
    let answer = bench.run(&["build", "foil.toml", "--out", "/proc/plankform/pack"]);
    assert_eq!(answer.status, 3, "{}", answer.err);
    assert!(answer.err.contains("cannot write"), "{}", answer.err);
    let answer = bench.run(&["section", "NACA 0012", "--svg", "/proc/section.svg"]);
    assert_eq!(answer.status, 3, "{}", answer.err);
}

/// The dxf crate is a second reader beside the ones in `tests/outside`.
#[test]
fn router_files_are_read_by_the_dxf_crate() {
    let bench = Bench::new();
    let design = demo("main-foil.toml");
    assert_eq!(bench.run(&["build", design.to_str().expect("a path"), "--out", "pack"]).status, 0);
    let files = contents(&bench.path().join("pack"));
    for (name, bytes) in files.iter().filter(|(name, _)| name.ends_with(".dxf")) {
        let drawing = dxf::Drawing::load(&mut bytes.as_slice()).expect(name);
        assert_eq!(drawing.header.default_drawing_units, dxf::enums::Units::Millimeters, "{name}");
        let contours: Vec<_> = drawing
            .entities()
            .filter(|e| e.common.layer == "CUT_OUTSIDE")
            .filter_map(|e| match &e.specific {
                dxf::entities::EntityType::LwPolyline(line) => Some(line),
                _ => None,
            })
            .collect();
        assert_eq!(contours.len(), 1, "{name}");
        assert!(contours[0].is_closed() && contours[0].vertices.len() > 4, "{name}");
    }
}
