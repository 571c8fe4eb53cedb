//! The verbs as a user types them: data, exit status, and what bad input gets.

mod common;

use common::{Bench, DESIGN};
use plankform::section::{Section, Side, TrailingEdge};

#[test]
fn section_prints_the_promised_keys() {
    let bench = Bench::new();
    let answer = bench.run(&["section", "NACA 23012", "--format", "json", "--points", "81"]);
    assert_eq!(answer.status, 0, "{}", answer.err);
    let json = answer.json();
    assert_eq!(json["section"], "NACA 23012");
    for key in [
        "thickness",
        "thickness_at",
        "camber",
        "camber_at",
        "nose_radius",
        "trailing_edge_thickness",
        "trailing_edge_angle_deg",
        "area",
    ] {
        assert!(json[key].is_f64(), "{key}: {}", json[key]);
    }
    let points = json["points"].as_array().expect("points");
    assert_eq!(points.len(), 81);
    // From the trailing edge over the upper side to the nose and back.
    assert!(points[0][1].as_f64() > Some(0.0) && points[80][1].as_f64() < Some(0.0));
    assert_eq!(points[40], serde_json::json!([0.0, 0.0]));

    let scaled = bench.run(&["section", "NACA 23012", "--chord", "12 cm", "--format", "json"]).json();
    let ratio = scaled["thickness"].as_f64().expect("mm") / json["thickness"].as_f64().expect("chord");
    assert!((ratio - 120.0).abs() < 1e-9);
    assert_eq!(scaled["unit"], "mm");
}

#[test]
fn section_prints_text_and_csv_and_draws() {
    let bench = Bench::new();
    let text = bench.run(&["section", "NACA 0012", "--svg", "section.svg"]);
    assert_eq!(text.status, 0, "{}", text.err);
    // Report 824: 4.683 % at 10 % of chord.
    assert!(text.out.lines().any(|l| l.contains("10.0000") && l.contains("4.6828")), "{}", text.out);
    let svg = std::fs::read_to_string(bench.path().join("section.svg")).expect("the picture");
    assert!(svg.starts_with("<svg") && svg.contains("NACA 0012"));
    let csv = bench.run(&["section", "NACA 0012", "--format", "csv", "--points", "5"]);
    let lines: Vec<&str> = csv.out.lines().collect();
    assert_eq!(lines.len(), 6);
    assert_eq!((lines[0], lines[3]), ("x,y", "0.00000000,0.00000000"));
}

#[test]
fn lift_prints_the_promised_keys() {
    let bench = Bench::new();
    let typed = ["lift", "NACA 4412", "--re", "1e6", "--angles", "-4:10:1", "--inviscid", "--pressure"];
    let answer = bench.run(&[&typed[..], &["--format", "json"]].concat());
    assert_eq!(answer.status, 0, "{}", answer.err);
    let curve = &answer.json()["curves"][0];
    assert!(curve["reynolds"].is_null() && curve["amplification"].is_null());
    let points = curve["points"].as_array().expect("points");
    assert_eq!(points.len(), 15);
    for (i, point) in points.iter().enumerate() {
        assert_eq!(point["angle_deg"].as_f64(), Some(i as f64 - 4.0));
        assert!(point["cl"].is_f64() && point["cm"].is_f64() && point["cp_min"].is_f64());
        assert!(point["cd"].is_null() && point["transition_upper"].is_null());
        let pressure = point["pressure"].as_array().expect("pressure");
        assert!(pressure.len() > 100 && pressure.iter().all(|p| p.as_array().is_some_and(|p| p.len() == 3)));
    }
    let text = bench.run(&["lift", "NACA 4412", "--angles", "4", "--inviscid", "--svg", "lift.svg"]);
    assert_eq!(text.status, 0, "{}", text.err);
    assert!(bench.path().join("lift.svg").exists());
    let csv = bench.run(&["lift", "NACA 4412", "--angles", "0:2:1", "--inviscid", "--format", "csv"]);
    assert_eq!(csv.out.lines().count(), 4);
}

#[test]
fn lift_with_friction_says_what_it_rests_on() {
    let bench = Bench::new();
    let typed = ["lift", "NACA 4412", "--re", "5e5,1e6", "--angles", "0:4:2", "--trip", "0.1,0.6"];
    let answer = bench.run(&[&typed[..], &["--format", "json"]].concat());
    assert_eq!(answer.status, 0, "{}", answer.err);
    let curves = answer.json()["curves"].as_array().expect("curves").clone();
    assert_eq!(curves.len(), 2);
    for (curve, reynolds) in curves.iter().zip([5e5, 1e6]) {
        assert_eq!(curve["reynolds"].as_f64(), Some(reynolds));
        assert_eq!((curve["amplification"].as_f64(), curve["trip_lower"].as_f64()), (Some(9.0), Some(0.6)));
        for point in curve["points"].as_array().expect("points") {
            assert_eq!(point["converged"].as_bool(), Some(true));
            assert!(point["cd"].as_f64().is_some_and(|cd| cd > 0.004 && cd < 0.03));
            assert!(point["transition_upper"].as_f64().is_some_and(|x| x < 0.1001));
        }
    }
    let text = bench.run(&[&typed[..], &["--svg", "lift.svg"]].concat());
    assert!(text.out.contains("trip at 0.6") && bench.path().join("lift.svg").exists(), "{}", text.out);
    let csv = bench.run(&[&typed[..], &["--format", "csv"]].concat());
    assert_eq!(csv.out.lines().count(), 7);
    for (arguments, says) in [
        (["--trip", "1.5"], "0 to 1"),
        (["--trip", "0.1,0.2,0.3"], "comma"),
        (["--amplification", "40"], "20"),
    ] {
        let answer =
            bench.run(&[&["lift", "NACA 0012", "--re", "1e6", "--angles", "4"][..], &arguments].concat());
        assert_eq!(answer.status, 2);
        assert!(answer.err.contains(says), "{}", answer.err);
    }
    let answer = bench.run(&["lift", "NACA 0012", "--re", "10", "--angles", "4"]);
    assert!(answer.status == 2 && answer.err.contains("Reynolds"), "{}", answer.err);
}

#[test]
fn wrong_command_lines_say_what_would_be_right() {
    let bench = Bench::new();
    for (arguments, says) in [
        (&["section", "NACA 44"][..], "four"),
        (&["section", "NACA 99999"], "thickness"),
        (&["section", "no such"], "NACA"),
        (&["section", "NACA 0012", "--chord", "120"], "mm"),
        (&["section", "NACA 0012", "--chord", "0 mm"], "1 mm"),
        (&["section", "NACA 0012", "--chord", "NaN mm"], "finite"),
        (&["section", "NACA 0012", "--points", "0"], "5"),
        (&["lift", "NACA 0012", "--inviscid", "--angles", "4:1:1"], "upwards"),
        (&["lift", "NACA 0012", "--inviscid", "--angles", "0:10:0"], "STEP"),
        (&["lift", "NACA 0012", "--inviscid", "--angles", "0:10:1e-9"], "2001"),
        (&["lift", "NACA 0012", "--inviscid", "--angles", "nan"], "number"),
        (&["lift", "NACA 0012", "--inviscid", "--angles", "1:2:3:4"], "FROM:TO:STEP"),
        (&["lift", "NACA 0012", "--inviscid", "--angles", "80"], "30"),
        (&["lift", "NACA 0012", "--re", "-1", "--angles", "4"], "more than zero"),
        (&["lift", "NACA 0012", "--angles", "4"], "--re"),
        (&["fly"], "unrecognized"),
    ] {
        let answer = bench.run(arguments);
        assert_eq!(answer.status, 2, "{arguments:?}: {}", answer.err);
        assert!(answer.err.contains(says), "{arguments:?} says {}", answer.err);
        assert_eq!(answer.out, "", "{arguments:?}");
    }
    assert!(bench.listing().is_empty());
}

#[test]
fn help_shows_an_example_that_runs() {
    for verb in ["new", "section", "lift", "check", "build", "schema", "completions", "manual"] {
        let bench = Bench::new();
        let help = bench.run(&[verb, "--help"]);
        assert_eq!(help.status, 0);
        let examples: Vec<&str> = help.out.lines().filter(|l| l.starts_with("  plankform ")).collect();
        assert!(!examples.is_empty(), "{verb}");
        for example in examples {
            let script = example.trim().replacen("plankform", env!("CARGO_BIN_EXE_plankform"), 1);
            let output = std::process::Command::new("sh")
                .args(["-c", &script])
                .current_dir(bench.path())
                .output()
                .expect("a shell");
            assert!(output.status.success(), "{example}: {}", String::from_utf8_lossy(&output.stderr));
        }
    }
}

#[test]
fn check_reports_each_limit() {
    let bench = Bench::new();
    bench.file("foil.toml", DESIGN);
    let answer = bench.run(&["check", "foil.toml", "--format", "json"]);
    assert_eq!(answer.status, 0, "{}", answer.err);
    let json = answer.json();
    assert_eq!(json["passed"], true);
    for check in json["checks"].as_array().expect("checks") {
        for key in ["name", "where", "value", "limit", "unit", "passed", "why"] {
            assert!(!check[key].is_null(), "{key} of {check}");
        }
    }
    assert_eq!(bench.listing(), ["foil.toml"], "check writes nothing");
}

#[test]
fn checks_outside_their_limit_are_told_and_change_the_exit_status() {
    const STALLS: &str = "design lift lies below the greatest lift, with friction";
    for (addition, names) in [
        ("[lift]\ndesign = 2.5\n", &["greatest lift in the range of incidence", STALLS][..]),
        ("[lift]\ndesign = -1.5\n", &["least lift in the range of incidence", STALLS]),
        ("[lift]\ndesign = 0.8\ntop-speed = \"40 kn\"\n", &["the section does not cavitate"]),
        ("[printer]\nbed-z = \"50 mm\"\n[masks]\nthickness = \"55 mm\"\n", &["printed piece fits the bed"]),
        ("[stock]\nlength = \"300 mm\"\nwidth = \"300 mm\"\n", &["template fits the stock sheet"]),
        (
            "[duty]\ncarries = \"40 kg\"\ntake-off = \"4 kn\"\n",
            &["the foil carries its load at take-off", "no part of the foil stalls"],
        ),
        (
            "[[cut]]\nfor = \"rod\"\nkind = \"slot\"\nat = 0.3\nwidth = \"6 mm\"\ndepth = \"7 mm\"\n",
            &["wood is left beside the cut"],
        ),
    ] {
        let bench = Bench::new();
        bench.file("foil.toml", &format!("{DESIGN}{addition}"));
        let answer = bench.run(&["check", "foil.toml", "--format", "json"]);
        assert_eq!(answer.status, 1, "{addition}: {}", answer.err);
        let json = answer.json();
        assert_eq!(json["passed"], false);
        let outside: Vec<&str> = json["checks"]
            .as_array()
            .expect("checks")
            .iter()
            .filter(|c| c["passed"] == false)
            .filter_map(|c| c["name"].as_str())
            .collect();
        assert!(names.iter().all(|name| outside.contains(name)), "{addition}: {outside:?}");
        assert!(outside.iter().all(|name| names.contains(name)), "{addition}: {outside:?}");
        // The files are written all the same, and say so.
        let built = bench.run(&["build", "foil.toml", "--out", "pack"]);
        assert_eq!(built.status, 1);
        let sheet = std::fs::read_to_string(bench.path().join("pack/sheet.html")).expect("the sheet");
        assert!(sheet.contains("outside their limit") && sheet.contains("OUTSIDE"));
    }
}

#[test]
fn new_writes_a_design_that_builds_and_overwrites_nothing() {
    for kind in ["main-foil", "elevator", "strut", "fin"] {
        let bench = Bench::new();
        let answer = bench.run(&["new", "mine.toml", "--kind", kind]);
        assert_eq!(answer.status, 0, "{}", answer.err);
        assert_eq!(bench.run(&["build", "mine.toml"]).status, 0, "{kind}");
        let before = std::fs::read(bench.path().join("mine.toml")).expect("the design");
        assert_eq!(bench.run(&["new", "mine.toml"]).status, 2);
        let text = String::from_utf8(before.clone()).expect("text");
        let schema =
            text.lines().next().and_then(|line| line.strip_prefix("#:schema ./")).expect("the schema line");
        let schema = std::fs::read(bench.path().join(schema)).expect("the schema");
        assert_eq!(schema, bench.run(&["schema"]).out.into_bytes());
        assert_eq!(std::fs::read(bench.path().join("mine.toml")).expect("the design"), before);
    }
}

#[test]
fn new_brings_an_old_schema_up_to_date_and_leaves_what_is_none() {
    let (name, title) = ("plankform-schema.json", "\"title\": \"Plankform design file\"");
    let bench = Bench::new();
    bench.file(name, &format!("{{ {title} }}"));
    assert_eq!(bench.run(&["new", "a.toml"]).status, 0);
    let now = std::fs::read_to_string(bench.path().join(name)).expect("the schema");
    assert!(now.contains(title) && now.contains("twist-about"));
    bench.file(name, "my own notes");
    let answer = bench.run(&["new", "b.toml"]);
    assert_eq!(answer.status, 0);
    assert!(answer.err.contains(name), "{}", answer.err);
    assert_eq!(std::fs::read_to_string(bench.path().join(name)).expect("the notes"), "my own notes");
}

#[test]
fn completions_and_manual_pages_follow_the_help() {
    let bench = Bench::new();
    for shell in ["bash", "zsh", "fish", "powershell", "elvish"] {
        let answer = bench.run(&["completions", shell]);
        assert_eq!(answer.status, 0, "{}", answer.err);
        for word in ["build", "amplification", "manual"] {
            assert!(answer.out.contains(word), "{word} in {shell}");
        }
    }
    let whole = bench.run(&["manual"]).out;
    assert!(whole.starts_with(".ie") || whole.contains(".TH plankform 1"), "{whole}");
    for verb in ["new", "section", "lift", "check", "build", "schema", "completions", "manual"] {
        assert!(whole.contains(verb), "{verb}");
        let page = bench.run(&["manual", verb]);
        assert_eq!(page.status, 0, "{}", page.err);
        assert!(page.out.contains(&format!(".TH plankform-{verb} 1")), "{}", page.out);
        assert!(page.out.contains("Example"), "{verb}");
    }
    assert_eq!(bench.run(&["manual", "fly"]).status, 2);
}

#[test]
fn schema_is_a_json_schema() {
    let json = Bench::new().run(&["schema"]).json();
    assert!(json["$schema"].as_str().is_some_and(|s| s.contains("draft-07")));
    assert!(json["properties"]["station"].is_object());
}

/// Every kind of wrong design file: the place, the reason, exit status 2, and nothing written.
#[test]
fn wrong_designs_are_answered_with_their_place() {
    let with = |from: &str, to: &str| {
        assert!(DESIGN.contains(from));
        DESIGN.replacen(from, to, 1)
    };
    let one_station = DESIGN.split("\n[[station]]\nat = \"200 mm\"").next().expect("the first").to_owned();
    for (text, place, says) in [
        ("this is not TOML".to_owned(), ":1:", "TOML"),
        (String::new(), "", "no design"),
        (with("chord = \"100 mm\"", "chord = 100"), ":9:9", "mm"),
        (with("chord = \"100 mm\"", "cord = \"100 mm\""), ":9:1", "chord"),
        (with("NACA 4412", "NACA 44"), ":10:11", "four"),
        (with("NACA 4412", "NACA 99999"), ":10:11", "thickness"),
        (with("chord = \"100 mm\"", "chord = \"0 mm\""), ":9:9", "5 mm"),
        (with("chord = \"100 mm\"", "chord = \"-80 mm\""), ":9:9", "5 mm"),
        (with("chord = \"100 mm\"", "chord = \"90 m\""), ":9:9", "2"),
        (with("chord = \"100 mm\"", "chord = \"NaN mm\""), ":9:9", "finite"),
        (with("chord = \"100 mm\"", "chord = nan"), ":9:9", "mm"),
        (one_station, "", "2 times at least"),
        (with("at = \"200 mm\"", "at = \"0 mm\""), ":13:", "0 mm"),
        (with("at = \"200 mm\"", "at = \"150 mm\""), ":13:", "200 mm"),
        (with("Trial foil", "../foil"), ":1:8", "name"),
        (with("Trial foil", "a/b"), ":1:8", "name"),
    ] {
        let bench = Bench::new();
        bench.file("foil.toml", &text);
        for verb in ["check", "build"] {
            let answer = bench.run(&[verb, "foil.toml"]);
            assert_eq!(answer.status, 2, "{text}: {}", answer.err);
            assert!(answer.err.contains(&format!("foil.toml{place}")), "{place} of {text}: {}", answer.err);
            assert!(answer.err.contains(says), "{says} for {text}: {}", answer.err);
            assert_eq!(answer.out, "");
        }
        assert_eq!(bench.listing(), ["foil.toml"]);
    }
}

#[test]
fn missing_and_unreadable_designs_are_a_failure_to_read() {
    let bench = Bench::new();
    for path in ["missing.toml", "."] {
        let answer = bench.run(&["build", path]);
        assert_eq!(answer.status, 3, "{}", answer.err);
        assert!(answer.err.contains("cannot read"), "{}", answer.err);
    }
    std::fs::write(bench.path().join("binary.toml"), [0xff, 0xfe, 0x00]).expect("a file");
    let answer = bench.run(&["build", "binary.toml"]);
    assert_eq!(answer.status, 2);
    assert!(answer.err.contains("UTF-8"));
}

/// Equations, points, drawings and designations are taken alike, and what was done is said.
#[test]
fn section_takes_files_of_every_kind() {
    let bench = Bench::new();
    let table = std::fs::read_to_string(common::demo("sections/old-rudder.txt")).expect("a table");
    bench.file("rudder.txt", &table);
    bench.file(
        "worked.toml",
        "name = \"Worked\"\n[coordinates]\nfile = \"rudder.txt\"\n[work]\nthickness = \"11 %\"\n",
    );
    // The router file of a template is an outline that can be traced in turn.
    bench.file("trial.toml", DESIGN);
    assert_eq!(bench.run(&["build", "trial.toml", "--out", "pack"]).status, 0);
    std::fs::copy(bench.path().join("pack/cut/trial-foil-station-0.dxf"), bench.path().join("traced.dxf"))
        .expect("a copy");

    for (named, says) in [
        ("rudder.txt", "Rudder from the shed wall"),
        ("worked.toml", "thickness            11.0000 % of chord"),
        ("traced.dxf", "The drawing is in millimetres: the chord is 100 mm long"),
    ] {
        let answer = bench.run(&["section", named]);
        assert_eq!((answer.status, answer.err.as_str()), (0, ""), "{named}");
        assert!(answer.out.contains(says), "{}", answer.out);
        assert_eq!(bench.run(&["lift", named, "--inviscid", "--angles", "2"]).status, 0, "{named}");
        // And at a station of a design.
        bench.file("own.toml", &DESIGN.replacen("NACA 4412", named, 1));
        let built = bench.run(&["build", "own.toml", "--out", "own", "--format", "json"]);
        assert_eq!(built.status, 0, "{}", built.err);
    }
    // Traced again, the outline is the one that it was, its thickness now across the chord. (Its camber is
    // less: the point furthest from the trailing edge, which a trace takes for the nose, lies above the
    // published one.)
    let traced = bench.run(&["section", "traced.dxf", "--format", "json"]).json();
    let known = Section::from_designation("NACA 4412", TrailingEdge::Published).expect("a section");
    let greatest = |value: &dyn Fn(f64, f64) -> f64| {
        let at = |x: f64| value(known.surface(Side::Upper, x), known.surface(Side::Lower, x));
        (1..1000).map(|i| at(f64::from(i) / 1000.0)).fold(0.0, f64::max)
    };
    for (key, expected) in
        [("thickness", greatest(&|upper, lower| upper - lower)), ("area", known.numbers().area)]
    {
        let value = traced[key].as_f64().expect("a number");
        // The router file keeps within 0.01 mm on a chord of 100.
        assert!((value - expected).abs() < 2e-4, "{key}: {value} {expected}");
    }
    assert!(!traced["remarks"].as_array().expect("remarks").is_empty());
}

#[test]
fn files_that_are_none_are_answered() {
    let bench = Bench::new();
    std::fs::create_dir(bench.path().join("folder.toml")).expect("a folder");
    bench.file("one-column.txt", "1\n2\n3\n");
    bench.file("not.dxf", "this is no drawing\n");
    bench.file("outside.toml", "name = \"a\"\n[coordinates]\nfile = \"../rudder.txt\"\n");
    for (named, status, says) in [
        ("folder.toml", 3, "folder.toml"),
        ("missing.txt", 3, "missing.txt"),
        ("one-column.txt", 2, "one-column.txt:2"),
        ("not.dxf", 2, "not.dxf"),
        ("outside.toml", 2, "beside the one that names it"),
    ] {
        let answer = bench.run(&["section", named]);
        assert_eq!((answer.status, answer.out.as_str()), (status, ""), "{named}: {}", answer.err);
        assert!(answer.err.contains(says), "{named}: {}", answer.err);
    }
}

/// A link in the design's folder does not lead out of it.
#[cfg(unix)]
#[test]
fn links_do_not_lead_out_of_the_folder() {
    let (bench, elsewhere) = (Bench::new(), Bench::new());
    let table = std::fs::read_to_string(common::demo("sections/old-rudder.txt")).expect("a table");
    let outside = elsewhere.file("rudder.txt", &table);
    std::os::unix::fs::symlink(&outside, bench.path().join("linked.txt")).expect("a link");
    bench.file("own.toml", &DESIGN.replacen("NACA 4412", "linked.txt", 1));
    let answer = bench.run(&["check", "own.toml"]);
    assert_eq!(answer.status, 2);
    assert!(answer.err.contains("a link leads out of the folder"), "{}", answer.err);
    // Named by the user it is read: that is the user's own doing.
    assert_eq!(bench.run(&["section", "linked.txt"]).status, 0);
}

#[test]
fn a_trailing_edge_is_opened_at_the_real_chord() {
    let bench = Bench::new();
    let answer = bench.run(&[
        "section",
        "NACA 4412",
        "--chord",
        "140 mm",
        "--trailing-edge",
        "1.2 mm",
        "--edge-from",
        "0.7",
        "--format",
        "json",
    ]);
    assert_eq!(answer.status, 0, "{}", answer.err);
    let thickness = answer.json()["trailing_edge_thickness"].as_f64().expect("mm");
    assert!((thickness - 1.2).abs() < 1e-8, "{thickness}");
    for (arguments, says) in [
        (&["NACA 4412", "--trailing-edge", "1.2 mm"][..], "needs the chord"),
        (&["NACA 4412", "--trailing-edge", "40 %"], "out of bounds"),
        (&["NACA 4412", "--trailing-edge", "blunt"], "write published, closed"),
        (&["NACA 4412", "--edge-from", "0.7"], "--trailing-edge"),
        (&["NACA 4412", "--trailing-edge", "closed", "--edge-from", "0.7"], "goes with a thickness"),
    ] {
        let answer = bench.run(&[&["section"], arguments].concat());
        assert_eq!((answer.status, answer.out.as_str()), (2, ""), "{arguments:?}");
        assert!(answer.err.contains(says), "{}", answer.err);
    }
}

/// A flap moves the curve up, and its hinge carries a moment; each deflection is a curve of its own.
#[test]
fn lift_takes_a_flap() {
    let bench = Bench::new();
    let with_flap =
        ["lift", "NACA 2412", "--angles", "0:2:2", "--flap", "-5,0,5", "--hinge", "0.7", "--format", "json"];
    for extra in [&["--inviscid"][..], &["--re", "1e6"]] {
        let answer = bench.run(&[&with_flap, extra].concat());
        assert_eq!(answer.status, 0, "{}", answer.err);
        let json = answer.json();
        let curves = json["curves"].as_array().expect("curves");
        let of = |key: &str| -> Vec<f64> {
            curves.iter().map(|c| c["points"][0][key].as_f64().expect("a number")).collect()
        };
        assert_eq!(
            curves.iter().map(|c| c["flap_deg"].as_f64()).collect::<Vec<_>>(),
            [Some(-5.0), Some(0.0), Some(5.0)]
        );
        // Trailing edge down lifts, and the water pushes it back up.
        let (lift, moment) = (of("cl"), of("hinge_moment"));
        assert!(lift[0] < lift[1] && lift[1] < lift[2], "{lift:?}");
        assert!(moment[0] > moment[1] && moment[1] > moment[2], "{moment:?}");
    }
    for (arguments, says) in [
        (&["--flap", "5"][..], "--hinge"),
        (&["--hinge", "0.7"], "--flap"),
        (&["--flap", "70", "--hinge", "0.7"], "60° at most"),
        (&["--flap", "5", "--hinge", "1.2"], "hinge is at 1.2"),
    ] {
        let answer = bench.run(&[&["lift", "NACA 2412", "--angles", "0", "--inviscid"], arguments].concat());
        assert_eq!((answer.status, answer.out.as_str()), (2, ""), "{arguments:?}");
        assert!(answer.err.contains(says), "{}", answer.err);
    }
}
