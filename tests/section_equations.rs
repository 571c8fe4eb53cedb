//! Sections written as equations: the parser, the derivatives, the checks, and the file.

mod common;

use std::collections::BTreeMap;
use std::time::{Duration, Instant};

use common::{Bench, demo};
use plankform::geometry::Curve;
use plankform::section::{
    DEEPEST_EXPRESSION, Expression, ExpressionError, LARGEST_SECTION_FILE, LONGEST_EXPRESSION, Section,
    Taylor, TrailingEdge,
};
use proptest::prelude::*;

fn constants() -> BTreeMap<String, f64> {
    BTreeMap::from([("m".to_owned(), 0.04), ("thick".to_owned(), 0.12)])
}

fn expression(text: &str) -> Expression {
    Expression::parse(text, &constants()).unwrap_or_else(|error| panic!("{text}: {error}"))
}

fn refused(text: &str) -> ExpressionError {
    Expression::parse(text, &constants()).expect_err(text)
}

fn four_digit_file(camber: &str, thickness: &str) -> String {
    format!("name = \"Mine\"\n{thickness}\n{camber}\n[constants]\nt = 0.12\nm = 0.04\np = 0.4\n")
}

/// The largest distance and difference of the derivatives between two outlines.
fn apart(one: &Section, other: &Section) -> [f64; 3] {
    let mut most = [0.0_f64; 3];
    for i in -500..=500 {
        let t = f64::from(i) / 500.0;
        let (a, b) = (one.jet(t), other.jet(t));
        let here = [a.point.distance(b.point), (a.first - b.first).hypot(), (a.second - b.second).hypot()];
        for (most, here) in most.iter_mut().zip(here) {
            assert!(here.is_finite(), "at {t}");
            *most = most.max(here);
        }
    }
    most
}

#[test]
fn published_equations_typed_in_give_the_published_section() {
    let camber = "[[camber]]\nfrom = 0\nto = \"p\"\ny = \"m/p^2*(2*p*x - x^2)\"\n\
                  [[camber]]\nfrom = 0.4\nto = 1\ny = \"m/(1-p)^2*((1 - 2*p) + 2*p*x - x^2)\"\n";
    for root in ["sqrt(x)", "x^0.5", "x^(1/2)"] {
        let thickness =
            format!("thickness = \"10*t*(0.2969*{root} - 0.1260*x - 0.3516*x^2 + 0.2843*x^3 - 0.1015*x^4)\"");
        for (camber, name) in [("", "NACA 0012"), (camber, "NACA 4412")] {
            let text = four_digit_file(camber, &thickness);
            let ours = Section::from_file_text(&text, "mine.toml").unwrap_or_else(|e| panic!("{e}"));
            let published = Section::from_designation(name, TrailingEdge::Published).expect("a section");
            let [place, first, second] = apart(&ours, &published);
            assert!(place < 1e-12 && first < 1e-12 && second < 1e-11, "{name}: {place} {first} {second}");
            let (a, b) = (ours.numbers(), published.numbers());
            for (a, b) in [
                (a.thickness, b.thickness),
                (a.camber, b.camber),
                (a.nose_radius, b.nose_radius),
                (a.nose_radius_on_outline, b.nose_radius_on_outline),
                (a.area, b.area),
            ] {
                assert!((a - b).abs() < 1e-12, "{name}: {a} {b}");
            }
            assert_eq!(ours.edge_word(), "open");
        }
    }
}

/// Half an ellipse, then a straight taper: the nose is exactly round, and the radius known.
#[test]
fn a_root_of_more_than_x_is_resolved_at_the_nose() {
    let text = "name = \"Ellipse\"\n[[thickness]]\nfrom = 0\nto = 0.5\nt = \"0.2*sqrt(x*(1 - x))\"\n\
                [[thickness]]\nfrom = 0.5\nto = 1\nt = \"0.2*(1 - x)\"\n";
    let section = Section::from_file_text(text, "e.toml").unwrap_or_else(|e| panic!("{e}"));
    // Half axes 0.5 and 0.05: b²/a = 0.005.
    assert!((section.numbers().nose_radius - 0.005).abs() < 1e-15);
    assert_eq!(section.edge_word(), "closed");
    // Half an ellipse and a triangle.
    let area = std::f64::consts::PI * 0.5 * 0.05 / 2.0 + 0.5 * 0.1 * 0.5;
    assert!((section.numbers().area - area).abs() < 1e-9, "{}", section.numbers().area - area);
}

#[test]
fn signs_bind_as_people_read_them() {
    for (text, value) in [
        ("-x^2", -9.0),
        ("2^3^2", 512.0),
        ("2^-1", 0.5),
        ("-2^-2", -0.25),
        ("--x", 3.0),
        ("2*-x", -6.0),
        ("8/4/2", 1.0),
        ("8-4-2", 2.0),
        ("2+3*4^2", 50.0),
        ("(2+3)*4", 20.0),
        ("1e-3*x", 0.003),
        ("1E3", 1000.0),
        (".5 + 5.", 5.5),
        ("min(x, 2) + max(x, 5)", 7.0),
        ("m*thick", 0.0048),
        ("ln(e) + log10(1000) + cos(pi)", 3.0),
        ("abs(-x)", 3.0),
        ("sqrt(x^2)", 3.0),
        ("asin(1) + acos(0) - pi", 0.0),
        ("exp(ln(x)) - cosh(0) - tanh(0)", 2.0),
        ("+x", 3.0),
    ] {
        let found = expression(text).at(3.0).value();
        assert!((found - value).abs() < 1e-14, "{text} is {found}");
    }
    assert_eq!(expression("2*pi").constant(), Some(2.0 * std::f64::consts::PI));
    assert_eq!(expression("0*x").constant(), None);
}

#[test]
fn wrong_expressions_are_marked_where_they_are_wrong() {
    for (text, span, says) in [
        ("2x", 1..2, "operator is missing"),
        ("x(1 - x)", 1..2, "operator is missing"),
        ("2 3", 2..3, "operator is missing"),
        ("2e", 1..2, "operator is missing"),
        ("sin x", 0..3, "parentheses"),
        ("1 + ", 4..4, "breaks off"),
        ("(1 + x", 0..1, "not closed"),
        ("sqrt(x", 4..5, "not closed"),
        ("1 + x)", 5..6, "closes nothing"),
        ("0,5*x", 1..2, "comma"),
        ("sqrt(x, 2)", 6..7, "comma"),
        ("min(x)", 5..6, "two arguments"),
        ("x**2", 1..3, "^"),
        ("2×x", 1..3, "no meaning"),
        ("1 + sqr(x)", 4..7, "not a name"),
        ("Thick*x", 0..5, "not a name"),
        ("x*/2", 2..3, "missing before '/'"),
        ("1e999", 0..5, "too large"),
        ("1.5.2", 3..5, "operator is missing"),
        (".", 0..1, "not a number"),
        ("  ", 0..2, "empty"),
    ] {
        let error = refused(text);
        assert_eq!(error.span, span, "{text}: {error}");
        assert!(error.message.contains(says), "{text}: {error}");
    }
    assert_eq!(refused("sqr(x)").help.as_deref(), Some("did you mean sqrt?"));
    assert_eq!(refused("Thick*x").help.as_deref(), Some("did you mean thick?"));
}

#[test]
fn no_text_takes_long_or_goes_too_deep() {
    let start = Instant::now();
    for piece in ["(", "-", "2^", "sqrt(", "min(", "x+", "9", "é", "1+(", "^", ")", " "] {
        let error = refused(&piece.repeat(100_000 / piece.len()));
        assert!(error.message.contains(&LONGEST_EXPRESSION.to_string()), "{error}");
        let _ = Expression::parse(&piece.repeat(LONGEST_EXPRESSION / piece.len()), &constants());
    }
    let nested = |levels: usize| format!("{}x{}", "(".repeat(levels), ")".repeat(levels));
    assert_eq!(expression(&nested(DEEPEST_EXPRESSION - 1)).at(0.5).value(), 0.5);
    assert!(refused(&nested(DEEPEST_EXPRESSION)).message.contains("nested"));
    assert!(refused(&format!("{}x", "-".repeat(900))).message.contains("nested"));
    let long = vec!["x"; LONGEST_EXPRESSION / 2].join("+");
    assert_eq!(expression(&long).at(1.0).value(), 1000.0);
    assert!(start.elapsed() < Duration::from_secs(5), "{:?}", start.elapsed());
}

/// As much work as a file of the greatest size can ask for: corners without end in every piece.
#[test]
fn a_hostile_file_is_answered_in_time() {
    let start = Instant::now();
    let restless = vec!["abs(sin(1e9*x))"; 120].join("+");
    let mut text = "name = \"a\"\n".to_owned();
    for i in 0..9 {
        let (from, to) = (f64::from(i) / 9.0, f64::from(i + 1) / 9.0);
        text.push_str(&format!("[[thickness]]\nfrom = {from}\nto = {to}\nt = \"{restless}\"\n"));
    }
    assert!(text.len() < LARGEST_SECTION_FILE && text.len() > LARGEST_SECTION_FILE * 4 / 5);
    assert!(Section::from_file_text(&text, "a.toml").is_err());
    assert!(start.elapsed() < Duration::from_secs(20), "{:?}", start.elapsed());
}

#[test]
fn corners_take_the_side_of_greater_x() {
    for (text, slope) in
        [("abs(x - 0.5)", 1.0), ("max(x, 0.5)", 1.0), ("min(x, 0.5)", 0.0), ("min(0.5, x)", 0.0)]
    {
        assert_eq!(expression(text).at(0.5).derivatives()[1], slope, "{text}");
    }
}

fn close(a: Taylor, b: Taylor) -> bool {
    let pairs = a.derivatives().into_iter().zip(b.derivatives());
    pairs.into_iter().all(|(a, b)| (a - b).abs() <= 1e-9 * (1.0 + a.abs().max(b.abs())))
}

/// Texts of expressions that are defined and tame for x from 0.1 to 0.9.
fn texts() -> impl Strategy<Value = String> {
    let leaf = prop_oneof![Just("x".to_owned()), (0.1..2.0_f64).prop_map(|v| format!("{v:.3}"))];
    leaf.prop_recursive(4, 24, 2, |inner| {
        let two = (inner.clone(), inner.clone());
        prop_oneof![
            two.clone().prop_map(|(a, b)| format!("({a}) + ({b})")),
            two.clone().prop_map(|(a, b)| format!("({a}) - ({b})")),
            two.clone().prop_map(|(a, b)| format!("({a})*({b})")),
            two.clone().prop_map(|(a, b)| format!("({a})/(1.5 + ({b})^2)")),
            two.prop_map(|(a, b)| format!("(1 + ({a})^2)^sin({b})")),
            (inner.clone(), prop::sample::select(vec!["sin", "cos", "atan", "tanh"]))
                .prop_map(|(a, f)| format!("{f}({a})")),
            (inner.clone(), prop::sample::select(vec!["sqrt", "ln", "log10"]))
                .prop_map(|(a, f)| format!("{f}(1 + ({a})^2)")),
            (inner, prop::sample::select(vec!["exp", "sinh", "cosh", "asin", "acos", "tan"]))
                .prop_map(|(a, f)| format!("{f}(0.7*sin({a}))")),
        ]
    })
}

proptest! {
    /// Each derivative against the central difference of the one below it.
    #[test]
    fn derivatives_agree_with_differences(text in texts(), x in 0.1..0.9_f64) {
        let text = text.as_str();
        prop_assume!(text.len() <= LONGEST_EXPRESSION);
        let compiled = expression(text);
        const STEP: f64 = 1e-4;
        let at = |x: f64| compiled.at(x).derivatives();
        // Fourth order in the step; the change from a step twice as long is the error allowed.
        let difference = |h: f64, k: usize| (8.0 * (at(x + h)[k] - at(x - h)[k]) - at(x + 2.0 * h)[k] + at(x - 2.0 * h)[k]) / (12.0 * h);
        let found = at(x);
        prop_assert!(found.iter().all(|v| v.is_finite()), "{text}");
        for order in 1..4 {
            let (fine, coarse) = (difference(STEP, order - 1), difference(2.0 * STEP, order - 1));
            let scale = 1.0 + found[order - 1].abs().max(fine.abs());
            prop_assert!((found[order] - fine).abs() <= 1e-8 * scale + (fine - coarse).abs(), "{text} order {order}: {} {fine}", found[order]);
        }
        // By the root: dy/dr = 2 r y', d²y/dr² = 2 y' + 4 x y''.
        let root = compiled.at_root(x.sqrt()).derivatives();
        let expected = [found[0], 2.0 * x.sqrt() * found[1], 2.0 * found[1] + 4.0 * x * found[2]];
        for (a, b) in root.iter().zip(expected) {
            prop_assert!((a - b).abs() <= 1e-9 * (1.0 + a.abs() + found[2].abs()), "{text}: {a} {b}");
        }
    }

    #[test]
    fn series_keep_the_identities(value in 0.1..0.9_f64, c1 in -2.0..2.0_f64, c2 in -2.0..2.0_f64, c3 in -2.0..2.0_f64) {
        let a = Taylor::from_coefficients([value, c1, c2, c3]);
        let one = Taylor::constant(1.0);
        prop_assert!(close(a * a, a.to_constant(2.0)));
        prop_assert!(close(a.to_constant(0.5) * a.to_constant(0.5), a));
        prop_assert!(close(a * (one / a), one));
        prop_assert!(close(a / a.to_constant(3.0), a.to_constant(-2.0)));
        prop_assert!(close(a.to_power(a) * a.to_power(-a), one));
        prop_assert!(close((a + one) * (a - one), a * a - one));
    }

    #[test]
    fn any_text_is_read_or_refused(text in ".{0,200}", signs in "[-+*/^(),.0-9xe a-z]{0,200}") {
        for text in [text, signs] {
            match Expression::parse(&text, &constants()) {
                Ok(compiled) => { let _ = (compiled.at(0.0), compiled.at_root(0.0), compiled.at(0.3)); }
                Err(error) => prop_assert!(error.span.start <= error.span.end && text.get(error.span.clone()).is_some(), "{text}: {error:?}"),
            }
            let _ = Section::from_file_text(&text, "any.toml");
            let _ = Section::from_file_text(&format!("name = \"a\"\nthickness = '{text}'\ncamber = '''{text}'''"), "any.toml");
        }
    }
}

const SOUND: &str = "0.3*sqrt(x)*(1 - x)";

/// Every refusal: what the file says, the line and column, and words of the answer.
#[test]
fn wrong_files_are_answered_with_their_place() {
    let thick = |t: &str| format!("name = \"a\"\nthickness = \"{t}\"\n");
    let camber = |y: &str| format!("name = \"a\"\nthickness = \"{SOUND}\"\ncamber = \"{y}\"\n");
    let pieces = |rows: &[(&str, &str, &str)]| {
        let mut text = format!("name = \"a\"\nthickness = \"{SOUND}\"\n");
        for (from, to, y) in rows {
            text.push_str(&format!("[[camber]]\nfrom = {from}\nto = {to}\ny = \"{y}\"\n"));
        }
        text
    };
    let mut misses = Vec::new();
    for (text, place, says) in [
        (String::new(), (1, 1), "name is missing"),
        ("name = ".to_owned(), (1, 8), "not TOML"),
        (" ".repeat(LARGEST_SECTION_FILE + 1), (1, 1), "bytes"),
        ("name = \"a\"\n".to_owned(), (1, 1), "thickness is missing"),
        (thick(SOUND).replace("\"a\"", "\"a/b\""), (1, 8), "name of a section"),
        (format!("{}chamber = \"x\"\n", thick(SOUND)), (3, 1), "did you mean camber?"),
        (thick("0.3*sqrt(x)*(1 - x"), (2, 26), "not closed"),
        (thick("0.3*sqr(x)"), (2, 18), "did you mean sqrt?"),
        (thick("0.3*sqrt(x)*ln(x)"), (2, 13), "no finite value at 0.00 %"),
        (thick("0.3*sqrt(x)*sqrt(1 - x)"), (2, 13), "slope has no finite value at 100.00 %"),
        (thick("0.3*x^0.25*(1 - x)"), (2, 13), "slope has no finite value at 0.00 %"),
        (thick("0.3*x*(1 - x)"), (2, 13), "nose is sharp"),
        (thick("0*x"), (2, 13), "nought everywhere"),
        (thick("0.1*sqrt(x)*(0.7 - x)"), (2, 13), "negative at 70.0"),
        (thick("sqrt(x)*(x - 0.5)^2*(1-x)"), (2, 13), "nought at 50"),
        (thick("0.01 + 0.1*sqrt(x)*(1 - x)"), (2, 13), "at the nose"),
        (thick("30*sqrt(x)*(1 - x)"), (2, 13), "not percent"),
        (thick("0.2*sqrt(x)*(1 - x) + 0.001*sin(50000*x)^2*x"), (2, 13), "swings too fast"),
        (thick("0.2*sqrt(x)*(1 - x) + 0.001*x/abs(x-0.3)*(x-0.3)"), (2, 13), "step at 30.00 %"),
        (camber("0.1*sqrt(x)*(1 - x)"), (3, 10), "slope has no finite value at 0.00 %"),
        (camber("0.1*x"), (3, 10), "trailing edge"),
        (camber("0.1 - 0.1*x"), (3, 10), "at the nose"),
        (camber("0.05*(0.5 - abs(x - 0.5))"), (3, 10), "turns sharply at 50.00 %"),
        (camber("8*x*(1 - x)"), (3, 10), "not percent"),
        (camber("0.02*sin(60*pi*x)"), (3, 10), "folds"),
        (camber("0.05*((x - 0.3)^2)^0.17*x*(1-x)"), (3, 10), "at 29."),
        (pieces(&[("0", "0.4", "0*x"), ("0.5", "1", "0*x")]), (7, 1), "begins at 0.5"),
        (pieces(&[("0", "0.4", "0*x")]), (3, 1), "end at 0.4"),
        (pieces(&[("0", "0", "0*x"), ("0", "1", "0*x")]), (3, 1), "covers nothing"),
        (pieces(&[("0", "0.5", "0*x"), ("0.5", "1", "0.01*(1 - x)")]), (10, 5), "step at 50.00 %"),
        (pieces(&[("0", "\"x\"", "0*x")]), (5, 6), "no place along the chord"),
        (pieces(&[("0", "true", "0*x")]), (5, 6), "no place along the chord"),
        (pieces(&[("0", "1", "2x")]), (6, 7), "operator"),
        (thick(SOUND) + "[[camber]]\nfrom = 0\nto = 1\n", (3, 1), "lacks y"),
        (thick(SOUND) + "camber = 3\n", (3, 10), "expression in quotes"),
        (thick(SOUND) + "[constants]\nx = 3\n", (4, 1), "meaning of its own"),
        (thick(SOUND) + "[constants]\nt-max = 3\n", (4, 1), "minus"),
        (thick(SOUND) + "[constants]\nm = nan\n", (4, 5), "finite number"),
        (thick(SOUND) + "[constants]\nm = \"1\"\n", (4, 5), "without quotes"),
    ] {
        let errors = Section::from_file_text(&text, "mine.toml").expect_err(&text);
        let shown = errors.to_string();
        let found: Vec<_> = errors.problems().iter().map(|p| (p.line, p.column)).collect();
        if !found.contains(&place) || !shown.contains(says) {
            misses.push(format!("{place:?} {says} for {text}: {shown}"));
        }
    }
    assert!(misses.is_empty(), "{}", misses.join("\n\n"));
}

#[test]
fn a_crossing_of_the_surfaces_is_refused() {
    // A hump, thick on its two walls where the mean line is straight, and thin at its crown: nothing
    // folds, but the walls run into each other below the crown.
    let thickness = "0.02*sqrt(x)*(1 - x) + wall*(exp(-((x - 0.415)/0.03)^2) + exp(-((x - 0.585)/0.03)^2))*sqrt(x)*(1 - x)";
    let camber = "0.3*(exp(-((x - 0.5)/0.12)^2) - exp(-(0.5/0.12)^2))";
    let made = |wall: f64| {
        let text = format!(
            "name = \"a\"\nthickness = \"{thickness}\"\ncamber = \"{camber}\"\n[constants]\nwall = {wall:?}\n"
        );
        Section::from_file_text(&text, "a.toml").map_err(|errors| errors.to_string())
    };
    assert!(made(0.1).is_ok());
    let shown = made(0.9).expect_err("a refusal");
    assert!(shown.contains("surfaces cross near"), "{shown}");
}

#[test]
fn the_verbs_take_section_files() {
    let bench = Bench::new();
    let file = demo("sections/scow-section.toml");
    let path = file.to_str().expect("a path");
    let answer = bench.run(&["section", path, "--format", "json"]);
    assert_eq!(answer.status, 0, "{}", answer.err);
    let json = answer.json();
    assert_eq!((&json["section"], &json["trailing_edge"]), (&"Scow main, second".into(), &"open".into()));
    assert!((json["camber"].as_f64().expect("camber") - 0.035).abs() < 1e-12);
    assert!((json["camber_at"].as_f64().expect("a place") - 0.45).abs() < 1e-9);
    let lift = bench.run(&["lift", path, "--inviscid", "--angles", "0:4:1"]);
    assert_eq!(lift.status, 0, "{}", lift.err);
    assert!(lift.out.contains("Scow main, second"));
    let closed = bench.run(&["section", path, "--trailing-edge", "closed"]);
    assert!(closed.out.contains("trailing edge        0.0000 % of chord thick"), "{}", closed.out);
    for (name, text, status, says) in [
        ("bad.toml", Some("name = \"a\"\nthickness = \"2x\"\n"), 2, "bad.toml:2:15"),
        ("missing.toml", None, 3, "cannot read missing.toml"),
    ] {
        if let Some(text) = text {
            bench.file(name, text);
        }
        let answer = bench.run(&["section", name]);
        assert_eq!((answer.status, answer.out.as_str()), (status, ""), "{}", answer.err);
        assert!(answer.err.contains(says), "{}", answer.err);
    }
}
