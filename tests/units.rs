//! Quantities as people write them.

#![allow(clippy::unwrap_used, reason = "in a test, a panic is the report")]

use plankform::units::{ANGLE, Angle, LENGTH, Length, UnitError};
use proptest::prelude::*;

fn mm(text: &str) -> f64 {
    text.parse::<Length>().unwrap_or_else(|error| panic!("{text}: {error}")).mm()
}

fn degrees(text: &str) -> f64 {
    text.parse::<Angle>().unwrap_or_else(|error| panic!("{text}: {error}")).degrees()
}

fn complaint(text: &str) -> String {
    text.parse::<Length>().expect_err(text).to_string()
}

#[test]
fn lengths_are_read_as_written() {
    let cases = [
        ("900 mm", 900.0),
        ("900mm", 900.0),
        ("  900   mm ", 900.0),
        ("+900 mm", 900.0),
        ("-3 mm", -3.0),
        ("\u{2212}3 mm", -3.0),
        ("35 in", 889.0),
        ("35 inches", 889.0),
        ("35\"", 889.0),
        ("2.5 cm", 25.0),
        ("1.2 m", 1200.0),
        ("3 ft", 914.4),
        ("1e2 mm", 100.0),
        ("1E-1mm", 0.1),
        (".5 m", 500.0),
        ("5. mm", 5.0),
    ];
    for (text, expected) in cases {
        assert!((mm(text) - expected).abs() < 1e-9, "{text} gave {}", mm(text));
    }
}

#[test]
fn angles_are_read_as_written() {
    assert_eq!(degrees("12 deg"), 12.0);
    assert_eq!(degrees("12°"), 12.0);
    assert_eq!(degrees("-4 deg"), -4.0);
    assert_eq!(degrees("4 degrees"), 4.0);
    let radians = "0.2 rad".parse::<Angle>().unwrap().radians();
    assert!((radians - 0.2).abs() < 1e-15, "{radians}");
    assert!((Angle::from_degrees(180.0).radians() - std::f64::consts::PI).abs() < 1e-15);
    assert!((Angle::from_radians(std::f64::consts::PI).degrees() - 180.0).abs() < 1e-12);
}

#[test]
fn a_bare_number_names_the_units() {
    assert_eq!(complaint("900"), "900 has no unit: a length is written in mm, cm, m, in or ft");
    let angle = "4".parse::<Angle>().unwrap_err();
    assert_eq!(angle.to_string(), "4 has no unit: an angle is written in deg or rad");
}

#[test]
fn an_unknown_unit_names_the_nearest() {
    let error = "900 MM".parse::<Length>().unwrap_err();
    assert!(matches!(error, UnitError::UnknownUnit { nearest: Some("mm"), .. }), "{error:?}");
    assert!(complaint("3 feets").ends_with("did you mean feet?"), "{}", complaint("3 feets"));
    let error = "9 kn".parse::<Length>().unwrap_err();
    assert!(matches!(error, UnitError::UnknownUnit { nearest: None, .. }), "{error:?}");
    // An exponent needs digits; without them the letter belongs to the unit.
    assert!(complaint("2e mm").starts_with("'e mm' is not a unit"), "{}", complaint("2e mm"));
}

#[test]
fn what_is_no_finite_number_is_refused() {
    for text in ["NaN mm", "nan", "inf mm", "-inf m", "Infinity mm", "1e999 mm", "1e308 m"] {
        let error = text.parse::<Length>().unwrap_err();
        assert!(matches!(error, UnitError::NotFinite { .. }), "{text}: {error:?}");
    }
    for text in ["mm", "wide", "- mm", "1.2.3 mm", "1_0 mm", "--3 mm", "+-3 mm"] {
        let error = text.parse::<Length>().unwrap_err();
        assert!(matches!(error, UnitError::NotANumber { .. }), "{text}: {error:?}");
    }
    // Inches start like infinity, and a unit alone is not a number.
    assert!(matches!("in".parse::<Length>().unwrap_err(), UnitError::NotANumber { .. }));
    assert!(complaint("2,5 cm").contains("2.5 and not 2,5"), "{}", complaint("2,5 cm"));
    for text in ["", "   ", "\t\n"] {
        assert!(matches!(text.parse::<Length>().unwrap_err(), UnitError::Empty { .. }), "{text:?}");
    }
}

#[test]
fn messages_neither_run_on_nor_carry_controls() {
    let long = format!("3 {}", "x".repeat(10_000));
    assert!(complaint(&long).chars().count() < 200, "{}", complaint(&long));
    let hostile = complaint("3 \u{1b}[31mmm");
    assert!(!hostile.chars().any(char::is_control), "{hostile:?}");
}

#[test]
fn lengths_and_angles_are_written_plainly() {
    assert_eq!(Length::from_mm(900.0).to_string(), "900 mm");
    assert_eq!(Length::from_mm(0.1 + 0.2).to_string(), "0.3 mm");
    assert_eq!(Length::from_mm(-0.0).to_string(), "0 mm");
    assert_eq!(Length::from_mm(-1e-9).to_string(), "-1e-9 mm");
    assert_eq!(Angle::from_degrees(-2.5).to_string(), "-2.5 deg");
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn any_text_is_read_or_refused(text in "\\PC{0,40}") {
        for quantity in [&LENGTH, &ANGLE] {
            match quantity.parse(&text) {
                Ok(value) => prop_assert!(value.is_finite()),
                Err(error) => prop_assert!(!error.to_string().is_empty()),
            }
        }
    }

    #[test]
    fn what_is_written_reads_back(value in -1e7..1e7_f64) {
        let back = mm(&Length::from_mm(value).to_string());
        prop_assert!((back - value).abs() <= 5.1e-7, "{value} came back as {back}");
        let back = degrees(&Angle::from_degrees(value).to_string());
        prop_assert!((back - value).abs() <= 5.1e-7, "{value} came back as {back}");
    }

    #[test]
    fn every_unit_agrees_with_millimetres(value in -1e4..1e4_f64) {
        for (unit, size) in [("mm", 1.0), ("cm", 10.0), ("m", 1000.0), ("in", 25.4), ("ft", 304.8)] {
            let read = mm(&format!("{value} {unit}"));
            prop_assert!((read - value * size).abs() <= 1e-9 * read.abs().max(1.0));
        }
    }

    #[test]
    fn whatever_the_pattern_lets_through_is_read(
        length in proptest::string::string_regex(LENGTH.pattern().trim_matches(['^', '$'])).unwrap(),
        angle in proptest::string::string_regex(ANGLE.pattern().trim_matches(['^', '$'])).unwrap(),
    ) {
        for (quantity, text) in [(&LENGTH, length), (&ANGLE, angle)] {
            match quantity.parse(&text) {
                Ok(_) | Err(UnitError::NotFinite { .. }) => {}
                Err(error) => prop_assert!(false, "{text}: {error}"),
            }
        }
    }
}
