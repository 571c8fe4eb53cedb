//! The limits on what is read: each is passed by one, and the answer names it. `docs/limits.md` is the same list;
//! `PLANKFORM_HANDBOOK=write cargo test --test limits` writes its table anew.

mod common;

use std::collections::BTreeMap;
use std::fmt::Write;
use std::path::Path;

use common::{Bench, DESIGN};
use plankform::design::{Design, LARGEST_FILE, Lift};
use plankform::section::coordinates::{LARGEST_DRAWING, LARGEST_TABLE, from_dxf, from_table};
use plankform::section::{DEEPEST_EXPRESSION, Expression, LARGEST_SECTION_FILE, LONGEST_EXPRESSION, Section};

struct Limit {
    what: &'static str,
    most: usize,
    unit: &'static str,
    /// What is said of one with so many.
    answer: fn(usize) -> Result<(), String>,
}

fn design(text: &str) -> Result<(), String> {
    Design::parse(text, "design.toml").map(|_| ()).map_err(|errors| errors.to_string())
}

fn section(text: &str) -> Result<(), String> {
    Section::from_file_text(text, "section.toml").map(|_| ()).map_err(|errors| errors.to_string())
}

fn expression(text: &str) -> Result<(), String> {
    Expression::parse(text, &BTreeMap::new()).map(|_| ()).map_err(|error| error.to_string())
}

/// A design with so many tables of one kind.
fn tables(count: usize, table: &str) -> Result<(), String> {
    design(&format!("{DESIGN}\n{}", table.repeat(count)))
}

fn stations(count: usize) -> Result<(), String> {
    let (head, _) = DESIGN.split_once("[[station]]").expect("stations");
    let span = 200.0;
    let station = |i: usize| {
        let at = span * i as f64 / (count - 1) as f64;
        format!("[[station]]\nat = \"{at} mm\"\nchord = \"100 mm\"\nsection = \"NACA 0012\"\n")
    };
    design(&format!("{head}{}", (0..count).map(station).collect::<String>()))
}

fn templates(count: usize) -> Result<(), String> {
    let places: Vec<String> =
        (0..count).map(|i| format!("\"{} mm\"", 200.0 * i as f64 / count as f64)).collect();
    design(&format!("{DESIGN}\n[templates]\nat = [{}]\n", places.join(", ")))
}

fn lift_points(count: usize) -> Result<(), String> {
    let step = 20.0 / (count - 1) as f64;
    design(&format!("{DESIGN}\n[lift]\nfrom = \"-10 deg\"\nto = \"10 deg\"\nstep = \"{step} deg\"\n"))
}

fn points(count: usize) -> Result<(), String> {
    let angle = |i: usize| std::f64::consts::TAU * i as f64 / count as f64;
    let mut text = String::new();
    for i in 0..count {
        let _ = writeln!(text, "{:.6} {:.6}", 0.5 + 0.5 * angle(i).cos(), 0.06 * angle(i).sin());
    }
    from_table(&text, "table.txt", None).map(|_| ()).map_err(|errors| errors.to_string())
}

fn numbers(count: usize) -> Result<(), String> {
    let step = 20.0 / (count - 1) as f64;
    let answer = Bench::new().run(&[
        "lift",
        "NACA 0012",
        "--inviscid",
        "--angles",
        &format!("-10:10:{step}"),
        "--format",
        "csv",
    ]);
    if answer.status == 0 { Ok(()) } else { Err(answer.err) }
}

const LIMITS: &[Limit] = &[
    Limit {
        what: "design file",
        most: LARGEST_FILE,
        unit: "bytes",
        answer: |n| design(&format!("{DESIGN}{}", "#".repeat(n - DESIGN.len()))),
    },
    Limit { what: "`[[station]]`", most: 100, unit: "in a design", answer: stations },
    Limit { what: "places of templates", most: 200, unit: "in a design", answer: templates },
    Limit {
        what: "`[[ply]]`",
        most: 60,
        unit: "in a design",
        answer: |n| {
            tables(
                n,
                "[[ply]]\ncloth = \"glass\"\nweight = \"20 g/m2\"\nfibre-density = \"2550 kg/m3\"\nthickness = \"0.001 mm\"\n",
            )
        },
    },
    Limit {
        what: "`[[cut]]`",
        most: 40,
        unit: "in a design",
        answer: |n| tables(n, "[[cut]]\nfor = \"rod\"\nkind = \"bore\"\nat = 0.3\nwidth = \"1 mm\"\n"),
    },
    Limit {
        what: "angles of a design's lift curve",
        most: Lift::MOST_POINTS,
        unit: "values",
        answer: lift_points,
    },
    Limit {
        what: "section file",
        most: LARGEST_SECTION_FILE,
        unit: "bytes",
        answer: |n| section(&format!("basis = \"NACA 0012\"\n{}", "#".repeat(n - 20))),
    },
    Limit {
        what: "expression",
        most: LONGEST_EXPRESSION,
        unit: "bytes",
        answer: |n| expression(&format!("x{}", " ".repeat(n - 1))),
    },
    Limit {
        what: "expressions in brackets within expressions",
        most: DEEPEST_EXPRESSION,
        unit: "deep",
        // The whole is the first of them.
        answer: |n| expression(&format!("{}x{}", "(".repeat(n - 1), ")".repeat(n - 1))),
    },
    Limit {
        what: "table of coordinates",
        most: LARGEST_TABLE,
        unit: "bytes",
        answer: |n| {
            from_table(&"#".repeat(n), "table.txt", None).map(|_| ()).map_err(|errors| errors.to_string())
        },
    },
    Limit { what: "points of a table", most: 20_000, unit: "points", answer: points },
    Limit {
        what: "traced drawing",
        most: LARGEST_DRAWING,
        unit: "bytes",
        answer: |n| {
            from_dxf(&vec![b' '; n], "drawing.dxf", None).map(|_| ()).map_err(|error| error.to_string())
        },
    },
    Limit { what: "angles of `lift`", most: 2001, unit: "values", answer: numbers },
];

#[test]
fn one_more_than_the_limit_is_refused_by_its_number() {
    for limit in LIMITS {
        let said = (limit.answer)(limit.most + 1).expect_err(limit.what);
        assert!(said.contains(&limit.most.to_string()), "{}, {}: {said}", limit.what, limit.most);
        // What stands at the limit may be wrong in itself, but is not too much.
        if let Err(said) = (limit.answer)(limit.most) {
            assert!(!said.contains(&limit.most.to_string()), "{}, {}: {said}", limit.what, limit.most);
        }
    }
}

#[test]
fn the_hand_book_lists_the_limits() {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("docs/limits.md");
    let page = std::fs::read_to_string(&path).expect("the page");
    let begin = page.find("| what |").expect("its table");
    let end = page[begin..].find("\n\n").map_or(page.len(), |length| begin + length + 1);
    let mut table = String::from("| what | at most |\n| --- | --- |\n");
    for limit in LIMITS {
        let digits = limit.most.to_string();
        let groups: Vec<&str> = digits
            .as_bytes()
            .rchunks(3)
            .rev()
            .map(|group| std::str::from_utf8(group).expect("digits"))
            .collect();
        let _ = writeln!(table, "| {} | {} {} |", limit.what, groups.join(" "), limit.unit);
    }
    if std::env::var_os("PLANKFORM_HANDBOOK").is_some_and(|value| value == "write") {
        std::fs::write(&path, format!("{}{table}{}", &page[..begin], &page[end..]))
            .expect("the page is written");
    } else {
        assert_eq!(&page[begin..end], table, "write it anew with PLANKFORM_HANDBOOK=write");
    }
}
