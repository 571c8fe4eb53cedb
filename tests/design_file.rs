//! The design file: what is read, and what is said about what cannot be.

#![allow(clippy::unwrap_used, reason = "in a test, a panic is the report")]

use plankform::design::{self, Design, DesignErrors, FlapKind, Kind, LARGEST_FILE, PlySide, Problem};
use plankform::section::{Beside, Finish};
use plankform::units::Length;
use proptest::prelude::*;

const MAIN_FOIL: &str = include_str!("../demo-sections/main-foil.toml");
const ELEVATOR: &str = include_str!("../demo-sections/elevator.toml");
const STRUT: &str = include_str!("../demo-sections/strut.toml");
const DEMOS: [(&str, &str); 3] =
    [("main-foil.toml", MAIN_FOIL), ("elevator.toml", ELEVATOR), ("strut.toml", STRUT)];

/// A small valid fin; tests spoil one line of it.
const FIN: &str = r#"name = "Test fin"
kind = "fin"
[planform]
span = "300 mm"
[[station]]
at = "0 mm"
chord = "120 mm"
section = "NACA 0012"
[[station]]
at = "300 mm"
chord = "80 mm"
section = "NACA 0010"
"#;

/// Reads a design that may name the demos as its neighbours.
fn read(text: &str, name: &str) -> Result<Design, DesignErrors> {
    let demo = |name: &str, _: usize| {
        let found = DEMOS.iter().find(|(file, _)| *file == name);
        found.map(|(_, text)| text.as_bytes().to_vec()).ok_or(std::io::ErrorKind::NotFound.into())
    };
    Design::parse_beside(text, name, &plankform::section::Beside::new(&demo))
}

fn good(text: &str) -> Design {
    read(text, "good.toml").unwrap_or_else(|errors| panic!("{errors}"))
}

fn bad(text: &str) -> DesignErrors {
    read(text, "bad.toml").expect_err(text)
}

/// The fin with one piece of text put for another, which must be there.
fn fin_with(from: &str, to: &str) -> String {
    assert!(FIN.contains(from), "{from}");
    FIN.replacen(from, to, 1)
}

/// The one problem of a file.
fn only(text: &str) -> Problem {
    let errors = bad(text);
    assert_eq!(errors.problems().len(), 1, "{errors}");
    errors.problems()[0].clone()
}

/// Checks the one problem of the spoilt fin: where it stands, and words of its message and help.
#[track_caller]
fn spoilt(from: &str, to: &str, place: (usize, usize), says: &[&str]) {
    let text = fin_with(from, to);
    let problem = only(&text);
    assert_eq!((problem.line, problem.column), place, "{}", bad(&text));
    let rendered = bad(&text).render(false);
    assert!(rendered.contains(&format!("bad.toml:{}:{}", place.0, place.1)), "{rendered}");
    let said = format!("{} {}", problem.message, problem.help.unwrap_or_default());
    for words in says {
        assert!(said.contains(words), "{words:?} is not in {said:?}");
    }
}

#[test]
fn demonstration_files_are_designs() {
    for (file, text) in DEMOS {
        let design = read(text, file).unwrap_or_else(|errors| panic!("{errors}"));
        let last = design.stations.last().unwrap();
        assert_eq!(last.at, design.reach(), "{file}");
        // A mask goes around the whole chord and has to lie on the bed.
        let bed = design.printer.bed_x.mm() - 2.0 * design.printer.margin.mm();
        for station in &design.stations {
            let mask = station.chord.mm() + 2.0 * (design.masks.wall.mm() + design.masks.clearance.mm());
            assert!(mask <= bed, "{file}: {mask} mm on {bed} mm");
        }
    }
    let foil = good(MAIN_FOIL);
    assert_eq!((foil.kind, foil.span.mm(), foil.half_span().mm()), (Kind::MainFoil, 900.0, 450.0));
    assert_eq!(foil.slug(), "scow-main-foil");
    assert_eq!(foil.stations[2].twist.degrees(), -1.5);
    assert_eq!(foil.stations[2].section.name(), "NACA 2412");
    let flap = foil.flap.unwrap();
    assert_eq!((flap.hinge, flap.from.mm(), flap.to.mm()), (0.7, 40.0, 400.0));
    assert_eq!(foil.lift.angles().len(), 33);
    assert_eq!(foil.lift.angles().last().unwrap().degrees(), 11.0);
}

#[test]
fn what_is_left_out_takes_its_default() {
    let fin = good(FIN);
    assert_eq!((fin.lift.from.degrees(), fin.lift.to.degrees(), fin.lift.design), (-4.0, 10.0, 0.4));
    assert_eq!(fin.lift.angles().len(), 15);
    assert_eq!((fin.masks.clearance.mm(), fin.masks.wall.mm(), fin.masks.thickness.mm()), (0.3, 10.0, 6.0));
    assert_eq!(
        (fin.printer.bed_x.mm(), fin.printer.bed_z.mm(), fin.printer.margin.mm()),
        (220.0, 250.0, 5.0)
    );
    assert_eq!((fin.paper.size.word(), fin.paper.overlap.mm()), ("A4", 10.0));
    assert_eq!(
        (fin.stock.length.mm(), fin.stock.width.mm(), fin.stock.thickness.mm()),
        (1200.0, 600.0, 18.0)
    );
    assert_eq!(fin.router.tolerance.mm(), 0.01);
    assert_eq!((fin.stations[1].twist.degrees(), fin.stations[1].sweep.mm()), (0.0, 0.0));
    assert_eq!(fin.stations[1].finish, Finish::Published);
    assert_eq!(fin.templates, [Length::from_mm(0.0), Length::from_mm(300.0)]);
    assert_eq!((fin.flap, fin.notes.clone()), (None, None));
    // A flap without ends takes the whole piece.
    let flap = good(&format!("{FIN}[flap]\nhinge = 0.7\n")).flap.unwrap();
    assert_eq!((flap.from.mm(), flap.to.mm(), flap.hinge_end), (0.0, 300.0, 0.7));
    assert_eq!((flap.kind, flap.up.degrees(), flap.down.degrees()), (FlapKind::LaminateUpper, 8.0, 12.0));
    assert!(fin.plies.is_empty() && !fin.has_skin());
    let ply = good(&format!("{FIN}[[ply]]\nweight = \"200 g/m2\"\n"));
    assert_eq!((ply.plies[0].to.mm(), ply.plies[0].on), (300.0, PlySide::Both));
    assert!((ply.skin().plies[0].thickness - 200.0 / (1800.0 * 0.45)).abs() < 1e-12);
    assert_ne!(ply.fingerprint(), fin.fingerprint());
}

#[test]
fn every_station_has_a_template_whatever_is_named_besides() {
    let mm = |text: &str| good(text).templates.iter().map(|at| at.mm()).collect::<Vec<_>>();
    assert_eq!(mm(&format!("{FIN}[templates]\nat = [\"120 mm\", \"200 mm\"]\n")), [0.0, 120.0, 200.0, 300.0]);
    // A place within a micrometre of a station is the station.
    assert_eq!(mm(&format!("{FIN}[templates]\nat = [\"0.0005 mm\", \"150 mm\"]\n")).len(), 3);
}

#[test]
fn starters_are_valid_and_their_marked_lines_are_the_defaults() {
    for kind in Kind::ALL {
        let text = design::starter(kind);
        let design = good(&text);
        assert_eq!(design.kind, kind);
        let (_, marked) = text.split_once("and its key.").unwrap();
        let defaults: String = marked
            .lines()
            .filter(|line| line.starts_with("# [") || line.contains(" = "))
            .fold(String::new(), |all, line| all + line.trim_start_matches("# ") + "\n");
        assert!(defaults.contains("bed-x = \"220 mm\""), "{defaults}");
        assert_eq!(good(&format!("{text}\n{defaults}")), design);
        // The places suggested for templates fit the span, and are more than the two stations.
        let places = text.replace("# [templates]", "[templates]").replace("# at =", "at =");
        assert!(good(&places).templates.len() > 2);
    }
}

#[test]
fn quantities_need_their_units() {
    spoilt("\"120 mm\"", "120", (7, 9), &["120 has no unit", "mm, cm, m, in or ft", "\"120 mm\""]);
    spoilt("\"120 mm\"", "\"120\"", (7, 9), &["120 has no unit", "mm, cm, m, in or ft"]);
    spoilt("\"120 mm\"", "\"120 mmm\"", (7, 9), &["'mmm' is not a unit", "did you mean mm?"]);
    spoilt("\"120 mm\"", "nan", (7, 9), &["'nan' is not a finite number"]);
    spoilt("\"120 mm\"", "-inf", (7, 9), &["'-inf' is not a finite number"]);
    spoilt("\"120 mm\"", "\"NaN mm\"", (7, 9), &["'NaN mm' is not a finite number"]);
    spoilt("\"120 mm\"", "\"1e999 mm\"", (7, 9), &["not a finite number"]);
    spoilt("\"120 mm\"", "\"\"", (7, 9), &["a length is wanted here, and nothing is written"]);
    spoilt("\"120 mm\"", "\"wide\"", (7, 9), &["'wide' does not start with a number"]);
    spoilt("\"120 mm\"", "true", (7, 9), &["a length from 5 mm to 2 m", "this is true or false"]);
    spoilt("\"120 mm\"", "[1]", (7, 9), &["a length from 5 mm to 2 m", "this is a list"]);
    spoilt("\"120 mm\"", "0x78", (7, 9), &["a length from 5 mm to 2 m", "this is a number"]);
    spoilt(
        "\"NACA 0012\"",
        "\"NACA 0012\"\ntwist = 3",
        (9, 9),
        &["3 has no unit", "deg or rad", "\"3 deg\""],
    );
}

#[test]
fn bounds_are_kept_and_named() {
    for chord in ["0 mm", "-3 mm", "4.9 mm", "2001 mm", "1e6 m"] {
        spoilt("\"120 mm\"", &format!("\"{chord}\""), (7, 9), &["chord is ", "a length from 5 mm to 2 m"]);
    }
    // What rounding puts a hair beyond a bound is brought back onto it.
    let twisted = good(&fin_with("\"NACA 0012\"", "\"NACA 0012\"\ntwist = \"0.5235987755983 rad\""));
    assert_eq!(twisted.stations[0].twist.degrees(), 30.0);
    spoilt(
        "\"NACA 0012\"",
        "\"NACA 0012\"\ntwist = \"30.001 deg\"",
        (9, 9),
        &["30.001 deg: it takes an angle"],
    );
    // The bounds themselves are inside, in every unit.
    for chord in ["5 mm", "0.5 cm", "2 m", "2000 mm"] {
        good(&fin_with("\"120 mm\"", &format!("\"{chord}\"")));
    }
    spoilt("\"300 mm\"", "\"19 mm\"", (4, 8), &["span is 19 mm: it takes a length from 20 mm to 10 m"])
}

#[test]
fn keys_are_known_or_guessed_at() {
    spoilt(
        "chord = \"120 mm\"",
        "chord = \"120 mm\"\nswep = \"3 mm\"",
        (8, 1),
        &["'swep'", "did you mean sweep?"],
    );
    spoilt("kind = \"fin\"", "kind = \"fin\"\nzzz = 1", (3, 1), &["'zzz' is not a key", "name, kind, notes"]);
    spoilt("kind = \"fin\"", "kind = \"fin\"\nchord = 1", (3, 1), &["chord is a key of [[station]]"]);
    // One slip is one problem: what is misspelt is not missing as well.
    spoilt(
        "chord = \"120 mm\"",
        "chrod = \"120 mm\"",
        (7, 1),
        &["'chrod' is not a key of [[station]]", "mean chord?"],
    );
    spoilt("[planform]", "[plan-form]", (3, 2), &["'plan-form'", "did you mean planform?"]);
    spoilt("[planform]", "[maks]\n[planform]", (3, 2), &["'maks'", "did you mean masks?"]);
    spoilt(
        "\"fin\"",
        "\"fim\"",
        (2, 8),
        &["'fim'", "\"main-foil\", \"elevator\", \"strut\" or \"fin\"", "mean \"fin\""],
    );
    spoilt("span = \"300 mm\"\n", "", (3, 1), &["span of [planform] is missing", "from 20 mm to 10 m"]);
    spoilt("kind = \"fin\"\n", "", (1, 1), &["kind is missing", "kind = \"main-foil\""]);
    spoilt("chord = \"80 mm\"\n", "", (9, 1), &["chord of [[station]] is missing"]);
}

#[test]
fn tables_stand_as_often_as_they_may() {
    spoilt("[planform]\nspan = \"300 mm\"\n", "", (1, 1), &["[planform] is missing", "span = \"900 mm\""]);
    spoilt(
        "[planform]",
        "[[planform]]",
        (3, 1),
        &["planform is a table, and this is a list", "write [planform]"],
    );
    let one = &FIN[..FIN.rfind("[[station]]").unwrap()];
    let problem = only(one);
    assert_eq!((problem.line, problem.column), (5, 1));
    assert!(
        problem.message.contains("wanted 2 times at least, and stands here only once"),
        "{}",
        problem.message
    );
    let single = one.replace("[[station]]", "[station]");
    assert!(only(&single).help.unwrap().contains("write [[station]]"));
    let none = &FIN[..FIN.find("[[station]]").unwrap()];
    assert!(only(none).message.starts_with("[[station]] is missing"));
    let mut many = FIN[..FIN.find("[[station]]").unwrap()].to_owned();
    for i in 0..101 {
        many += &format!("[[station]]\nat = \"{} mm\"\nchord = \"90 mm\"\nsection = \"NACA 0012\"\n", 3 * i);
    }
    // The hundredth, the last that is read, also lies 3 mm short of the end.
    let errors = bad(&many);
    assert!(errors.problems().iter().any(|problem| problem.message.contains("at most 100")), "{errors}");
}

#[test]
fn sections_are_looked_up_where_they_stand() {
    spoilt("\"NACA 0012\"", "\"NACA 44\"", (8, 11), &["'NACA 44' has 2 digits"]);
    spoilt("\"NACA 0012\"", "\"NACA 99999\"", (8, 11), &["99"]);
    spoilt("\"NACA 0012\"", "\"flat plate\"", (8, 11), &["'flat plate' is not a section"]);
    spoilt("\"NACA 0012\"", "12", (8, 11), &["section takes text", "this is a number"]);
    spoilt("\"NACA 0012\"", &format!("\"{}\"", "9".repeat(201)), (8, 11), &["201 characters"]);
    let closed = good(&fin_with("\"NACA 0012\"", "\"naca0012\"\ntrailing-edge = \"closed\""));
    assert_eq!(closed.stations[0].section.name(), "NACA 0012");
    assert_eq!(closed.stations[0].designation, "naca0012");
    assert!(closed.stations[0].section.numbers().trailing_edge_thickness < 1e-15);
}

#[test]
fn sections_come_from_files_beside_the_design() {
    let files = |name: &str, _most: usize| {
        match name {
        "own/flat.toml" => Ok(b"name = \"Flat\"\nthickness = \"0.3*sqrt(x)*(1 - x)\"\n".to_vec()),
        "own/flat-again.toml" => {
            Ok(b"# the same, written otherwise\nname = \"Other\"\nthickness = \"k*sqrt(x)*(1 - x)\"\n[constants]\nk = 0.3\n".to_vec())
        }
        "own/other.toml" => Ok(b"name = \"Flat\"\nthickness = \"0.300001*sqrt(x)*(1 - x)\"\n".to_vec()),
        "own/blend.toml" => {
            Ok(b"name = \"Half\"\n[blend]\nfirst = \"flat.toml\"\nsecond = \"NACA 2412\"\nshare = 0.5\n".to_vec())
        }
        "bad.toml" => Ok(b"name = \"Bad\"\nthickness = \"0.3*sqrt(x)*(1 - y)\"\n".to_vec()),
        "round.toml" => {
            Ok(b"name = \"Round\"\n[blend]\nfirst = \"round.toml\"\nsecond = \"NACA 2412\"\nshare = 0.5\n".to_vec())
        }
        _ => Err(std::io::Error::from(std::io::ErrorKind::NotFound)),
    }
    };
    let read = |named: &str| {
        let text = fin_with("\"NACA 0012\"", &format!("\"{named}\""));
        Design::parse_beside(&text, "fin.toml", &Beside::new(&files))
    };
    let flat = read("own/flat.toml").expect("a design");
    assert_eq!(flat.stations[0].section.name(), "Flat");
    assert_eq!(flat.stations[0].designation, "own/flat.toml");
    let blend = read("own/blend.toml").expect("a design");
    let half = 0.5 * (flat.stations[0].section.numbers().area + 0.0822 * 1.0);
    assert!((blend.stations[0].section.numbers().area - half).abs() < 2e-3);

    // The mark on every piece follows the shape, not its words.
    let again = read("own/flat-again.toml").expect("a design");
    let other = read("own/other.toml").expect("a design");
    assert_eq!(flat.fingerprint(), again.fingerprint());
    assert_ne!(flat.fingerprint(), other.fingerprint());

    let says = |named: &str| read(named).expect_err(named).to_string();
    assert!(says("bad.toml").contains("bad.toml, line 2, column"), "{}", says("bad.toml"));
    assert!(says("bad.toml").contains("plankform section"), "{}", says("bad.toml"));
    assert!(says("none.toml").contains("none.toml cannot be read"), "{}", says("none.toml"));
    assert!(says("round.toml").contains("names itself"), "{}", says("round.toml"));
    for outside in
        ["../flat.toml", "/etc/flat.toml", "own//flat.toml", "./flat.toml", "own\\\\flat.toml", "c:flat.toml"]
    {
        assert!(says(outside).contains("beside the one that names it"), "{}", says(outside));
    }
    // Without files beside it there is nothing to read.
    let alone = fin_with("\"NACA 0012\"", "\"own/flat.toml\"");
    assert!(Design::parse(&alone, "fin.toml").expect_err("no files").to_string().contains("cannot be read"));
}

#[test]
fn a_trailing_edge_is_as_thick_as_asked_at_its_chord() {
    let design =
        good(&fin_with("\"NACA 0012\"", "\"NACA 0012\"\ntrailing-edge = \"0.9 mm\"\nedge-from = 0.7"));
    let station = &design.stations[0];
    let thickness = station.section.numbers().trailing_edge_thickness * station.chord.mm();
    assert!((thickness - 0.9).abs() < 1e-9, "{thickness}");
    let plain = good(&fin_with("\"NACA 0012\"", "\"NACA 0012\""));
    assert_ne!(design.fingerprint(), plain.fingerprint());
    spoilt(
        "\"NACA 0012\"",
        "\"NACA 0012\"\ntrailing-edge = \"blunt\"",
        (9, 17),
        &["trailing-edge is 'blunt'", "\"published\" or \"closed\", or a length"],
    );
    spoilt("\"NACA 0012\"", "\"NACA 0012\"\ntrailing-edge = 1", (9, 17), &["1 mm"]);
    spoilt(
        "\"NACA 0012\"",
        "\"NACA 0012\"\ntrailing-edge = \"40 mm\"",
        (8, 11),
        &["trailing-edge is to be 33.3333", "takes 0 to 10 %"],
    );
}

#[test]
fn a_duty_is_for_a_level_foil_and_its_speeds_go_upwards() {
    let duty = "\n[duty]\ncarries = \"160 kg\"\ntake-off = \"9 kn\"\n";
    let says = |text: &str| bad(text).to_string();
    assert!(says(&format!("{FIN}{duty}")).contains("a foil that lies level"));
    let foil = MAIN_FOIL.replace("cruise = \"14 kn\"", "cruise = \"8 kn\"");
    assert!(says(&foil).contains("cruise does not lie above take-off"), "{}", says(&foil));
    let foil = MAIN_FOIL.replace("top-speed = \"20 kn\"", "top-speed = \"5 m/s\"");
    assert!(says(&foil).contains("top-speed of [lift] does not lie above take-off"));
    let design = good(MAIN_FOIL);
    let duty = design.duty.expect("a duty");
    // A knot is 1852 m an hour.
    assert!((duty.take_off - 10.5 * 1852.0 / 3600.0).abs() < 1e-12 && duty.share == 0.85);
    assert!((design.lift.top_speed.expect("a speed") - 20.0 * 1852.0 / 3600.0).abs() < 1e-12);
}

#[test]
fn stations_run_from_the_root_to_the_end() {
    spoilt("at = \"0 mm\"", "at = \"10 mm\"", (6, 6), &["first station lies at 10 mm", "at = \"0 mm\""]);
    spoilt(
        "at = \"300 mm\"",
        "at = \"290 mm\"",
        (10, 6),
        &["last station lies at 290 mm", "at = \"300 mm\""],
    );
    spoilt("at = \"300 mm\"", "at = \"0 mm\"", (10, 6), &["the same place"]);
    let middle = "[[station]]\nat = \"400 mm\"\nchord = \"90 mm\"\nsection = \"NACA 0012\"\n[[station]]\nat = \"300 mm\"";
    spoilt(
        "[[station]]\nat = \"300 mm\"",
        middle,
        (14, 6),
        &["lies at 300 mm, nearer to the root", "400 mm"],
    );
    // A micrometre either way is the rounding of another unit.
    good(&fin_with("at = \"300 mm\"", "at = \"300.0009 mm\""));
    only(&fin_with("at = \"300 mm\"", "at = \"300.002 mm\""));
    // The mirrored kinds end at half the span.
    let errors = bad(&fin_with("\"fin\"", "\"main-foil\""));
    assert_eq!(errors.problems()[0].help.as_deref(), Some("write at = \"150 mm\""), "{errors}");
    assert!(errors.problems()[0].message.contains("half the span of 300 mm is 150 mm"), "{errors}");
}

#[test]
fn names_are_safe_to_call_files_by() {
    for name in ["../x", "a/b", "a..b", "C:\\\\x"] {
        spoilt(
            "\"Test fin\"",
            &format!("\"{name}\""),
            (1, 8),
            &["files are named after it", "other folders"],
        );
    }
    for name in ["", " x", "-x", ".x", "a\\u0000b", "a:b", "füß", "x\\n"] {
        spoilt("\"Test fin\"", &format!("\"{name}\""), (1, 8), &["1 to 60 letters"]);
    }
    spoilt("\"Test fin\"", &format!("\"{}\"", "x".repeat(61)), (1, 8), &["61 characters"]);
    let long = "x".repeat(60);
    assert_eq!(good(&fin_with("Test fin", &long)).slug(), long);
    assert_eq!(good(&fin_with("Test fin", "Main  foil - No_2 ")).slug(), "main-foil-no_2");
}

#[test]
fn further_tables_agree_with_themselves() {
    let with = |tables: &str| format!("{FIN}{tables}\n");
    let says = |tables: &str, line: usize, words: &str| {
        let problem = only(&with(tables));
        let said = format!("{} {}", problem.message, problem.help.clone().unwrap_or_default());
        assert!(said.contains(words), "{words:?} is not in {said:?}");
        assert_eq!(problem.line, line, "{}", bad(&with(tables)));
    };
    says("[templates]\nat = [\"0 mm\", \"200 mm\", \"100 mm\"]", 14, "nearer to the root");
    says("[templates]\nat = [\"0 mm\", \"0 mm\"]", 14, "the same place");
    says("[templates]\nat = [\n\"0 mm\",\n\"301 mm\"]", 16, "301 mm, but the span is 300 mm");
    says("[templates]\nat = []", 14, "has 0 places");
    says("[templates]\nat = \"0 mm\"", 14, "a list of up to 200 lengths");
    says("[templates]\nat = [\"0 mm\", 10]", 14, "10 has no unit");
    says("[flap]\nhinge = 0.2", 14, "hinge is 0.2: it takes a number from 0.3 to 0.95");
    says("[flap]\nhinge = \"0.7\"", 14, "stands without quotes");
    says("[flap]\nhinge = nan", 14, "not a finite number");
    says("[flap]", 13, "hinge of [flap] is missing");
    says("[flap]\nhinge = 0.7\nhinge-end = \"60 mm\"", 15, "write both as fractions, or both as lengths");
    says("[flap]\nhinge = 0.7\nhinge-from = \"nose\"", 15, "a fraction counts from the nose");
    // Chords of 120 mm at the root and, after 300 mm, 80 mm: at most 0.95 of the smaller.
    says("[flap]\nhinge = \"90 mm\"", 14, "from the nose where the chord is");
    says("[flap]\nhinge = \"50 mm\"\nhinge-end = \"90 mm\"", 14, "to \"");
    says("[flap]\nhinge = \"3 mm\"\nhinge-from = \"trailing-edge\"", 14, "3 mm from the trailing edge");
    says(
        "[[cut]]\nfor = \"rod\"\nkind = \"slot\"\ndepth = \"5 mm\"\nat = 0.3",
        13,
        "width is missing: a slot wants it",
    );
    says("[[cut]]\nfor = \"bolt\"\nkind = \"hole\"\nwidth = \"6 mm\"\nat = 0.3", 13, "span-at is missing");
    let hole = "[[cut]]\nfor = \"bolt\"\nkind = \"hole\"\nwidth = \"6 mm\"\nat = 0.3\nspan-at = ";
    says(&format!("{hole}\"1 mm\""), 18, "\"3 mm\" or more");
    says(&format!("{hole}\"299 mm\""), 18, "it lies at \"300 mm\" at most");
    let pocket = "[[cut]]\nfor = \"spar\"\nkind = \"pocket\"\ndepth = \"2 mm\"\nchord-to = 0.3\n";
    says(pocket, 13, "chord-from is missing: a pocket wants it");
    says(&format!("{pocket}chord-from = 0.4"), 18, "leaves nothing between");
    says("[flap]\nhinge = 0.7\nto = \"400 mm\"", 15, "400 mm, but the span is 300 mm");
    says("[flap]\nhinge = 0.7\nfrom = \"300 mm\"", 15, "leaves nothing between");
    says("[lift]\nfrom = \"5 deg\"\nto = \"5 deg\"", 15, "the last must lie above the first");
    says("[lift]\nstep = \"0 deg\"", 14, "an angle from 0.01 deg to 20 deg");
    says("[lift]\nstep = \"0.02 deg\"", 14, "701 angles: 500 at most");
    says("[lift]\nto = \"21 deg\"", 14, "an angle from -20 deg to 20 deg");
    says("[lift]\ndesign = 4", 14, "a number from -3 to 3");
    says("[masks]\nclearance = \"0 mm\"", 14, "from 0.05 mm to 5 mm");
    says("[paper]\nsize = \"a4\"", 14, "did you mean \"A4\"?");
    says("[stock]\nwidth = \"200 mm\"\nmargin = \"100 mm\"", 15, "nothing is left of width");
    assert_eq!(
        bad(&with("[printer]\nbed-x = \"60 mm\"\nbed-y = \"60 mm\"\nmargin = \"30 mm\"")).problems().len(),
        2
    );
    // The step that the message names is one that is taken.
    good(&with("[lift]\nstep = \"0.029 deg\""));
}

#[test]
fn files_that_are_no_designs_are_refused_once() {
    for text in ["", "\n\n", "# only a comment\n"] {
        assert!(only(text).message.contains("holds no design"), "{text:?}");
    }
    let problem = only("name = \"x\"\nkind = = 3\n");
    assert_eq!((problem.line, problem.column), (2, 8));
    assert!(problem.message.contains("not TOML"), "{}", problem.message);
    let twice = only("name = \"x\"\nname = \"y\"\n");
    assert_eq!((twice.line, twice.column), (2, 1));
    assert!(only("%PDF-1.4 \u{0}\u{1}").message.contains("not TOML"));
    for deep in ["[", "a = [", "a = {b = ", "a.", "[[", "a = [[{x=[", "[a.", "\n[x]\na = ["] {
        let errors = bad(&deep.repeat(100_000 / deep.len()));
        assert!(!errors.render(false).is_empty());
    }
    let large = format!("{FIN}# {}\n", "x".repeat(LARGEST_FILE));
    assert!(only(&large).message.contains("1000000 at most"));
    let just = format!("{FIN}# {}\n", "x".repeat(LARGEST_FILE - FIN.len() - 3));
    assert_eq!((just.len(), good(&just)), (LARGEST_FILE, good(FIN)));
}

#[test]
fn a_flood_of_problems_is_cut_short() {
    let flood: String = (0..90_000).map(|i| format!("k{i}=1\n")).collect();
    let errors = bad(&flood);
    assert_eq!(errors.problems().len(), 100);
    assert!(errors.more() > 80_000, "{}", errors.more());
    assert!(errors.render(true).len() < 100_000);
    // The end of an endless line is not led up to a hundred times either.
    let keys: String = (0..200).map(|i| format!(", k{i} = 1")).collect();
    let errors = bad(&format!("planform = {{ z = \"{}\"{keys} }}\n", "x".repeat(900_000)));
    let last = errors.problems().last().unwrap();
    assert!(last.column > 900_000, "{last:?}");
    let rendered = errors.render(false);
    assert!(rendered.contains(&format!("bad.toml:1:{}\n", last.column)));
    assert!(rendered.len() < 100_000, "{}", rendered.len());
}

#[test]
fn all_problems_are_reported_together_in_order() {
    let text = r#"name = "a/b"
kind = "foil"
colour = "red"
[planform]
span = 900
	[[station]]
	at = "0 mm" # tab before
chord = "0 mm"
section = "NACA 44"
[[station]]
at = "450 mm"
section = "NACA 0012"
é = "1 mm"
"#
    .replace("é = ", "\"é\" = 1\ntwist = \"45°\" # ");
    let errors = bad(&text);
    let places: Vec<(usize, usize)> =
        errors.problems().iter().map(|problem| (problem.line, problem.column)).collect();
    let expected = [(1, 8), (2, 8), (3, 1), (5, 8), (8, 9), (9, 11), (10, 1), (13, 1), (14, 9)];
    assert_eq!(places, expected, "{errors}");
    let rendered = errors.render(false);
    for (line, column) in expected {
        assert!(rendered.contains(&format!("bad.toml:{line}:{column}\n")), "{line}:{column} in {rendered}");
    }
    assert!(!rendered.contains('\u{1b}'));
    assert!(errors.render(true).contains("\u{1b}["));
    assert_eq!(errors.to_string(), rendered);
    for problem in errors.problems() {
        assert!(text.get(problem.span.clone()).is_some(), "{problem:?}");
    }
    assert_eq!(&text[errors.problems()[4].span.clone()], "\"0 mm\"");
}

#[test]
fn columns_count_characters_after_wide_ones() {
    let text =
        fin_with("chord = \"120 mm\"", "\t\"sweep\" = \"3 mm\"\n \"twist\"\t= \"ü\"\nchord = \"120 mm\"");
    let problem = only(&text);
    assert_eq!((problem.line, problem.column), (8, 12));
    let text = fin_with("[planform]", "planform = { \"ü\" = 1, span = \"300 mm\" }").replacen(
        "span = \"300 mm\"\n",
        "",
        1,
    );
    let problem = only(&text);
    assert_eq!((problem.line, problem.column), (3, 14));
}

#[test]
fn nothing_of_the_file_reaches_the_terminal_as_a_command() {
    let hostile = r#""\u001b[31mred\u0007""#;
    for from in ["\"Test fin\"", "\"fin\"", "\"300 mm\"", "\"NACA 0012\""] {
        let rendered = bad(&fin_with(from, hostile)).render(false);
        assert!(!rendered.chars().any(|c| c.is_control() && c != '\n'), "{rendered:?}");
    }
    let turned = bad(&fin_with("\"NACA 0012\"", "\"NACA \u{202e}0012\"")).render(false);
    assert!(!turned.contains('\u{202e}'), "{turned:?}");
    let errors = Design::parse("x = \u{1b}[31m", "a\u{1b}[31m.toml").unwrap_err();
    assert!(!errors.render(false).contains('\u{1b}'));
}

#[test]
fn the_fingerprint_follows_the_shape_and_nothing_else() {
    let fin = good(FIN).fingerprint();
    assert_eq!(fin.len(), 9);
    assert!(fin.bytes().enumerate().all(|(i, b)| if i == 4 { b == b'-' } else { b.is_ascii_hexdigit() }));

    let same = [
        fin_with("\"300 mm\"", "\"30 cm\""),
        fin_with("\"120 mm\"", "\"0.12 m\""),
        fin_with("Test fin", "Another name"),
        fin_with("kind = \"fin\"", "# a comment\nkind = \"fin\"\nnotes = \"words\""),
        fin_with("at = \"0 mm\"\nchord = \"120 mm\"", "chord = \"120 mm\"\nat = \"0 mm\""),
        fin_with("\"NACA 0012\"", "\"naca0012\"\ntwist = \"-0 rad\""),
        format!("{FIN}[templates]\nat = [\"0 mm\", \"300 mm\"]\n"),
        format!("{FIN}[printer]\nbed-y = \"200 mm\"\n[stock]\nthickness = \"12 mm\"\n"),
        format!("{FIN}[masks]\nwall = \"1 cm\"\n[lift]\nto = \"8 deg\"\n[paper]\nsize = \"A3\"\n"),
    ];
    for text in same {
        assert_eq!(good(&text).fingerprint(), fin, "{text}");
    }
    let inches = fin_with("\"120 mm\"", "\"5 in\"");
    assert_eq!(good(&inches).fingerprint(), good(&fin_with("\"120 mm\"", "\"127 mm\"")).fingerprint());

    let other = [
        fin_with("\"120 mm\"", "\"120.001 mm\""),
        fin_with("\"fin\"", "\"strut\""),
        fin_with("\"NACA 0012\"", "\"NACA 0013\""),
        fin_with("\"NACA 0012\"", "\"NACA 0012\"\ntrailing-edge = \"closed\""),
        fin_with("\"NACA 0012\"", "\"NACA 0012\"\ntwist = \"0.1 deg\""),
        fin_with("\"NACA 0012\"", "\"NACA 0012\"\nsweep = \"1 mm\""),
        FIN.replace("\"300 mm\"", "\"301 mm\""),
        format!("{FIN}[templates]\nat = [\"0 mm\", \"150 mm\", \"300 mm\"]\n"),
        format!("{FIN}[flap]\nhinge = 0.7\n"),
        format!("{FIN}[masks]\nclearance = \"0.4 mm\"\n"),
        format!("{FIN}[router]\ntolerance = \"0.02 mm\"\n"),
    ];
    let mut seen = vec![fin];
    for text in other {
        let fingerprint = good(&text).fingerprint();
        assert!(!seen.contains(&fingerprint), "{text}");
        seen.push(fingerprint);
    }
}

/// The ends of a foil: a shaped tip, one hand or two, the case and the water.
#[test]
fn ends_agree_with_the_foil() {
    let planform = |keys: &str| fin_with("span = \"300 mm\"", &format!("span = \"300 mm\"\n{keys}"));
    let says = |keys: &str, line: usize, words: &str| {
        let problem = only(&planform(keys));
        let said = format!("{} {}", problem.message, problem.help.clone().unwrap_or_default());
        assert!(said.contains(words), "{words:?} is not in {said:?}");
        assert_eq!(problem.line, line, "{}", bad(&planform(keys)));
    };
    says("tip = \"pointed\"", 5, "\"square\", \"rounded\" or \"cut\"");
    says("tip-length = \"20 mm\"", 5, "this one is square");
    says("tip = \"cut\"\ntip-length = \"300 mm\"", 6, "\"150 mm\" is half of it");
    says("tip = \"cut\"\ntip-chord = \"150 mm\"", 6, "the last station has");
    says("in-case = \"301 mm\"", 5, "the span is 300 mm");
    says("in-case = \"300 mm\"", 5, "nothing is left below it");
    says("in-case = \"100 mm\"\nwaterline = \"50 mm\"", 6, "\"100 mm\" or more");
    let foil =
        fin_with("\"fin\"", "\"main-foil\"").replace("\"300 mm\"\n", "\"600 mm\"\nin-case = \"10 mm\"\n");
    assert!(bad(&foil).to_string().contains("for what stands upright"), "{foil}");

    let fin = good(&planform("in-case = \"100 mm\"\ntip = \"rounded\""));
    assert_eq!((fin.in_case.mm(), fin.waterline.mm()), (100.0, 100.0));
    let tip = fin.tip.expect("a tip");
    let last = fin.stations.last().expect("a station").chord.mm();
    assert_eq!((tip.length.mm(), tip.about), (0.5 * last, 0.5));
    assert!((tip.chord.mm() - last / 3.0).abs() < 1e-9);
    // Where the tip begins a template is made.
    assert!(fin.templates.iter().any(|at| (at.mm() - 300.0 + 0.5 * last).abs() < 1e-9));
    let foil = fin_with("\"fin\"", "\"main-foil\"");
    let foil = good(&foil.replace("span = \"300 mm\"", "span = \"300 mm\"\nhands = \"one-handed\""));
    assert!(!foil.in_halves() && foil.reach().mm() == 300.0 && !foil.wing().expect("a foil").is_mirrored());
}

#[test]
fn the_schema_names_every_key_with_its_bounds() {
    let schema = design::schema();
    assert_eq!(schema["$schema"], "http://json-schema.org/draft-07/schema#");
    assert_eq!(schema["additionalProperties"], false);
    assert_eq!(schema["required"], serde_json::json!(["name", "kind", "planform", "station"]));
    let station = &schema["properties"]["station"];
    assert_eq!((station["minItems"].as_u64(), station["maxItems"].as_u64()), (Some(2), Some(100)));
    assert_eq!(station["items"]["required"], serde_json::json!(["at", "chord", "section"]));
    let chord = &station["items"]["properties"]["chord"];
    assert!(chord["description"].as_str().unwrap().contains("a length from 5 mm to 2 m"));
    assert!(chord["pattern"].as_str().unwrap().contains("mm|cm|m|in"));
    let hinge = &schema["properties"]["flap"]["properties"]["hinge"]["anyOf"];
    assert_eq!(hinge[0]["maximum"], 0.95);
    assert!(hinge[1]["pattern"].as_str().unwrap().contains("mm|cm|m|in"));
    assert_eq!(
        schema["properties"]["paper"]["properties"]["size"]["anyOf"][0]["enum"],
        serde_json::json!(["A4", "A3", "Letter"])
    );
    assert_eq!(schema["properties"]["lift"]["properties"]["design"]["default"], 0.4);
}

/// Puts every example and every default of the schema into a file: they must be read as they stand.
#[test]
fn examples_and_defaults_of_the_schema_are_read() {
    let schema = design::schema();
    let mut tried = 0;
    for (table, about) in schema["properties"].as_object().unwrap() {
        let inner =
            if about["type"] == "array" { &about["items"]["properties"] } else { &about["properties"] };
        for (key, about) in inner.as_object().into_iter().flatten() {
            let examples = about["examples"].as_array().unwrap().iter().chain(about.get("default"));
            for value in examples {
                let header = if table == "station" { "[[station]]" } else { &format!("[{table}]") };
                let text = format!("{header}\n{key} = {value}\n");
                let errors = bad(&text);
                // A station by itself is rightly told that it does not lie at the root, and a name that
                // nothing bears it.
                let alone =
                    ["the first station", "there is no [[material]]", "a material of unidirectional fibre"];
                let about_it = errors.problems().iter().find(|problem| {
                    problem.line == 2 && !alone.iter().any(|start| problem.message.starts_with(start))
                });
                assert!(about_it.is_none(), "{errors}");
                tried += 1;
            }
        }
    }
    assert!(tried > 40, "{tried}");
}

#[test]
fn the_hand_book_shows_the_registry() {
    let page = include_str!("../docs/design-file.md").replace("\r\n", "\n");
    if std::env::var_os("PLANKFORM_HANDBOOK").is_some_and(|word| word == "write") {
        let (head, rest) = page.split_once("<!-- keys -->\n").expect("the mark before the tables");
        let (_, tail) = rest.split_once("<!-- end of keys -->").expect("the mark behind them");
        let tables = design::key_tables();
        let path = concat!(env!("CARGO_MANIFEST_DIR"), "/docs/design-file.md");
        std::fs::write(path, format!("{head}<!-- keys -->\n{tables}<!-- end of keys -->{tail}")).unwrap();
        return;
    }
    let (_, tables) = page.split_once("<!-- keys -->\n").expect("the mark before the tables");
    let (tables, _) = tables.split_once("<!-- end of keys -->").expect("the mark behind them");
    assert_eq!(
        tables.trim(),
        design::key_tables().trim(),
        "docs/design-file.md is stale: PLANKFORM_HANDBOOK=write cargo test --test design_file writes it"
    );
}

#[test]
fn the_worked_example_of_the_hand_book_is_a_design() {
    let page = include_str!("../docs/design-file.md").replace("\r\n", "\n");
    let (_, rest) = page.split_once("```toml\n").unwrap();
    let (example, rest) = rest.split_once("```").unwrap();
    good(example);
    // The page goes on with a slip in it and with what is said then.
    let (_, rest) = rest.split_once("```text\n").unwrap();
    let (said, _) = rest.split_once("```").unwrap();
    let errors =
        Design::parse(&example.replace("chord = \"80 mm\"", "chrod = \"80 mm\""), "fin.toml").unwrap_err();
    assert_eq!(said.trim(), errors.to_string().trim());
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 400, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn any_bytes_are_read_or_refused(bytes in proptest::collection::vec(any::<u8>(), 0..400)) {
        let text = String::from_utf8_lossy(&bytes);
        if let Err(errors) = Design::parse(&text, "any.toml") {
            prop_assert!(!errors.problems().is_empty());
            prop_assert!(errors.render(false).contains("any.toml:"));
        }
    }

    #[test]
    fn a_design_with_bytes_put_anywhere_is_read_or_refused(
        at in 0..MAIN_FOIL.len(),
        length in 0..40_usize,
        put in "[\\PC\t\r\n\\[\\]{}='\"#,.0-9]{0,12}",
    ) {
        let start = MAIN_FOIL.floor_char_boundary(at);
        let end = MAIN_FOIL.floor_char_boundary((start + length).min(MAIN_FOIL.len()));
        let text = format!("{}{put}{}", &MAIN_FOIL[..start], &MAIN_FOIL[end..]);
        if let Err(errors) = Design::parse(&text, "spoilt.toml") {
            prop_assert!(!errors.problems().is_empty());
            let rendered = errors.render(false);
            for problem in errors.problems() {
                let place = format!("spoilt.toml:{}:{}", problem.line, problem.column);
                prop_assert!(rendered.contains(&place), "{} in {}", place, rendered);
            }
        }
    }

    #[test]
    fn valid_designs_come_back_in_every_unit(
        half_span in 20.0..4000.0_f64,
        chords in proptest::collection::vec(5.0..2000.0_f64, 2..12),
        twist in -30.0..30.0_f64,
    ) {
        let write = |scale: f64, unit: &str, angle: (f64, &str)| {
            let mut text = format!("name = \"x\"\nkind = \"elevator\"\n[planform]\nspan = \"{} {unit}\"\n", 2.0 * half_span / scale);
            for (i, chord) in chords.iter().enumerate() {
                let at = half_span * i as f64 / (chords.len() - 1) as f64;
                text += &format!(
                    "[[station]]\nat = \"{} {unit}\"\nchord = \"{} {unit}\"\nsection = \"NACA 0012\"\ntwist = \"{} {}\"\n",
                    at / scale, chord / scale, twist / angle.0, angle.1
                );
            }
            text
        };
        let plain = good(&write(1.0, "mm", (1.0, "deg")));
        prop_assert_eq!(plain.span.mm(), 2.0 * half_span);
        for (station, chord) in plain.stations.iter().zip(&chords) {
            prop_assert_eq!(station.chord.mm(), *chord);
            prop_assert_eq!(station.twist.degrees(), twist);
        }
        for (scale, unit) in [(10.0, "cm"), (1000.0, "m"), (25.4, "in"), (304.8, "ft")] {
            let other = good(&write(scale, unit, (1_f64.to_degrees(), "rad")));
            for (a, b) in plain.stations.iter().zip(&other.stations) {
                prop_assert!((a.at.mm() - b.at.mm()).abs() < 1e-9 * half_span.max(1.0));
                prop_assert!((a.chord.mm() - b.chord.mm()).abs() < 1e-8);
                prop_assert!((a.twist.degrees() - b.twist.degrees()).abs() < 1e-12);
            }
        }
    }
}
