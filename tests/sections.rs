//! Published sections against the printed tables and their own equations.
//!
//! The tables and their sources are in `tests/reference/sections.toml`.

use plankform::geometry::Curve;
use plankform::section::{MeanLine, Section, SectionError, Side, TrailingEdge};
use proptest::prelude::*;
use serde::Deserialize;

fn published(designation: &str) -> Section {
    Section::from_designation(designation, TrailingEdge::Published).expect("a published section")
}

#[derive(Deserialize)]
struct Reference {
    symmetric: Symmetric,
    cambered: Cambered,
    check_point: Vec<CheckPoint>,
    plain: Vec<FiveDigitLine>,
    reflexed: Vec<FiveDigitLine>,
}

#[derive(Deserialize)]
struct Symmetric {
    rounding: f64,
    stations: Vec<f64>,
    section: Vec<SymmetricSection>,
}

#[derive(Deserialize)]
struct SymmetricSection {
    name: String,
    ordinates: Vec<f64>,
    nose_radius: f64,
}

#[derive(Deserialize)]
struct Cambered {
    rounding: f64,
    stations: Vec<f64>,
    section: Vec<CamberedSection>,
}

#[derive(Deserialize)]
struct CamberedSection {
    name: String,
    upper: Vec<f64>,
    lower: Vec<f64>,
    upper_computed: Vec<f64>,
    lower_computed: Vec<f64>,
    strays: f64,
    beyond_last_digit: usize,
}

#[derive(Deserialize)]
struct CheckPoint {
    name: String,
    x: f64,
    upper: [f64; 2],
    lower: [f64; 2],
}

#[derive(Deserialize)]
struct FiveDigitLine {
    name: String,
    position: f64,
    joint: f64,
    front: f64,
    #[serde(default)]
    rear_ratio: f64,
}

fn reference() -> Reference {
    toml::from_str(include_str!("reference/sections.toml")).expect("the reference tables")
}

/// Report 824, appendix: printed to 0.001 % of chord.
#[test]
fn symmetric_ordinates_agree_to_the_last_printed_digit() {
    let table = reference().symmetric;
    for printed in table.section {
        let section = published(&format!("NACA {}", printed.name));
        for (x, y) in table.stations.iter().zip(&printed.ordinates) {
            let [upper, lower] =
                [Side::Upper, Side::Lower].map(|side| 100.0 * section.surface(side, x / 100.0));
            // Half a unit of the last digit, and the slack of a tie rounded by hand.
            let allowed = 0.55 * table.rounding;
            println!("{} at {x} %: printed {y}, computed {upper:.5}", printed.name);
            assert!((upper - y).abs() <= allowed, "{} at {x} %: {upper} against {y}", printed.name);
            assert!((upper + lower).abs() < 1e-12);
        }
        let radius = 100.0 * section.numbers().nose_radius;
        assert!((radius - printed.nose_radius).abs() < 0.011, "{}: {radius}", printed.name);
    }
}

/// Report 824, appendix: printed to 0.01 % of chord, with the hand computation's own scatter.
#[test]
fn cambered_ordinates_agree_with_the_equations_and_the_print() {
    let table = reference().cambered;
    for printed in table.section {
        let section = published(&format!("NACA {}", printed.name));
        let mut beyond = 0;
        let sides = [
            (Side::Upper, &printed.upper, &printed.upper_computed),
            (Side::Lower, &printed.lower, &printed.lower_computed),
        ];
        for (side, print, computed) in sides {
            // The last station is the end of the surface, which lies off x = 1 by a trace.
            let rows = table.stations.iter().zip(print).zip(computed).filter(|((x, _), _)| **x < 100.0);
            for ((x, print), computed) in rows {
                let ours = 100.0 * section.surface(side, x / 100.0);
                println!("{} {side:?} at {x} %: printed {print}, ours {ours:.4}", printed.name);
                assert!((ours - computed).abs() < 0.6e-4, "{} {side:?} {x}: {ours} {computed}", printed.name);
                assert!((ours - print).abs() <= printed.strays + 1e-4);
                beyond += usize::from((ours - print).abs() > 1.05 * table.rounding);
            }
        }
        println!("{}: {beyond} of 32 printed values stray by more than their last digit", printed.name);
        assert_eq!(beyond, printed.beyond_last_digit, "{}", printed.name);
    }
}

#[test]
fn thickness_is_laid_off_perpendicular_to_the_mean_line() {
    for expected in reference().check_point {
        let section = published(&format!("NACA {}", expected.name));
        let root = (expected.x / 100.0).sqrt();
        for (t, [x, y]) in [(-root, expected.upper), (root, expected.lower)] {
            let point = section.jet(t).point;
            assert!((100.0 * point.x - x).abs() < 1e-8, "{} {}: {point:?}", expected.name, expected.x);
            assert!((100.0 * point.y - y).abs() < 1e-8, "{} {}: {point:?}", expected.name, expected.x);
        }
    }
}

/// First sine coefficients of a mean line's slope over θ, x = (1 - cos θ)/2.
/// H. Glauert, The Elements of Aerofoil and Airscrew Theory (1926), chapter VII.
fn thin_section(slope: impl Fn(f64) -> f64) -> (f64, f64) {
    const STEPS: usize = 20_000;
    let coefficient = |n: f64| {
        let sum: f64 = (0..STEPS)
            .map(|i| {
                let theta = (i as f64 + 0.5) * std::f64::consts::PI / STEPS as f64;
                slope(0.5 * (1.0 - theta.cos())) * (n * theta).cos()
            })
            .sum();
        2.0 / STEPS as f64 * sum
    };
    (coefficient(1.0), coefficient(2.0))
}

/// The reports state the conditions; here they are solved again: the slope is zero at the position
/// of greatest camber, and the design lift coefficient is 0.3.
#[test]
fn five_digit_constants_follow_from_their_conditions() {
    let table = reference();
    for line in &table.plain {
        // p = m (1 - sqrt(m / 3)) by bisection.
        let (mut low, mut high): (f64, f64) = (0.0, 1.0);
        for _ in 0..80 {
            let m = 0.5 * (low + high);
            if m * (1.0 - (m / 3.0).sqrt()) < line.position { low = m } else { high = m }
        }
        println!("{}: joint derived {low:.5}, printed {}", line.name, line.joint);
        assert!((low - line.joint).abs() < 0.0005, "{}: {low}", line.name);

        let unit = MeanLine::FiveDigit { joint: line.joint, front: 1.0, rear_ratio: 0.0 };
        let (first, _) = thin_section(|x| unit.at(x).slope);
        let front = 0.3 / (std::f64::consts::PI * first);
        let off = line.front / front - 1.0;
        println!(
            "{}: front cubic derived {front:.3}, printed {} ({:+.3} %)",
            line.name,
            line.front,
            100.0 * off
        );
        // The prints of the two foremost lines do not follow from their own joints: 210 is 2.8 %
        // high, 220 0.63 %. The others agree to their rounding.
        let expected = match line.name.as_str() {
            "210" => 0.0280,
            "220" => 0.0063,
            _ => 0.0,
        };
        assert!((off - expected).abs() < 4e-4, "{}: {off}", line.name);
    }
    for line in &table.reflexed {
        let (m, p) = (line.joint, line.position);
        let ratio = (3.0 * (m - p).powi(2) - m.powi(3)) / (1.0 - m).powi(3);
        println!("{}: ratio derived {ratio:.6}, printed {}", line.name, line.rear_ratio);
        assert!((ratio / line.rear_ratio - 1.0).abs() < 5e-4, "{}: {ratio}", line.name);
        // The reflex is there to take the moment away: A1 = A2 for no moment about the quarter chord.
        let camber = MeanLine::FiveDigit { joint: m, front: line.front, rear_ratio: line.rear_ratio };
        let (first, second) = thin_section(|x| camber.at(x).slope);
        let moment = -std::f64::consts::FRAC_PI_4 * (first - second);
        assert!(moment.abs() < 0.0014, "{}: moment {moment}", line.name);
    }
}

#[test]
fn the_design_uses_the_printed_constants() {
    let table = reference();
    let lines = table.plain.iter().map(|l| (l, false)).chain(table.reflexed.iter().map(|l| (l, true)));
    for (line, reflexed) in lines {
        let digit = line.name.as_bytes()[1] - b'0';
        let ours = MeanLine::five_digit(0.3, digit, reflexed).expect("a published line");
        let MeanLine::FiveDigit { joint, front, rear_ratio } = ours else { panic!("five digits") };
        assert_eq!([joint, front, rear_ratio], [line.joint, line.front, line.rear_ratio]);
    }
}

#[test]
fn trailing_edges_are_open_as_published_or_closed() {
    for name in ["NACA 0012", "NACA 4412", "NACA 23112"] {
        let open = published(name).numbers().trailing_edge_thickness;
        // 0.21 of 12 % thickness.
        assert!((open - 0.00252).abs() < 1e-12, "{name}: {open}");
        let closed = Section::from_designation(name, TrailingEdge::Closed).expect("a section");
        assert!(closed.numbers().trailing_edge_thickness < 1e-15);
    }
}

#[test]
fn numbers_of_the_four_digit_form() {
    // Closed forms of the thickness polynomial, Report 460: area 0.685083 t, greatest thickness
    // 1.000288 t at 29.983 % of chord, nose radius 1.1019 t².
    let n = published("NACA 0012").numbers();
    assert!((n.area - 0.685_083_333 * 0.12).abs() < 1e-9, "{}", n.area);
    assert!((n.thickness / 0.12 - 1.000_287_88).abs() < 1e-8, "{}", n.thickness);
    assert!((n.thickness_at - 0.299_827_88).abs() < 1e-8, "{}", n.thickness_at);
    assert!((n.nose_radius - 1.101_870_13 * 0.0144).abs() < 1e-10);
    assert!((n.nose_radius - n.nose_radius_on_outline).abs() < 1e-12);
    assert_eq!(n.camber, 0.0);
    let n = published("NACA 4412").numbers();
    assert!((n.camber - 0.04).abs() < 1e-14 && (n.camber_at - 0.4).abs() < 1e-12);
}

#[test]
fn derivatives_agree_with_differences() {
    for name in ["NACA 0012", "NACA 6409", "NACA 23012", "NACA 25112"] {
        let section = published(name);
        for i in 1..200 {
            let t = -1.0 + 0.01 * f64::from(i) + 0.0013;
            let h = 1e-5;
            let (before, here, after) = (section.jet(t - h), section.jet(t), section.jet(t + h));
            let first = (after.point - before.point) / (2.0 * h);
            let second = (after.first - before.first) / (2.0 * h);
            assert!((first - here.first).hypot() < 1e-6, "{name} at {t}: {first:?} {:?}", here.first);
            // A joint of the mean line between the two sides of a difference spoils it.
            if section.breaks().iter().all(|joint| (t - joint).abs() > 2.0 * h) {
                assert!((second - here.second).hypot() < 1e-4, "{name} at {t}");
            }
        }
    }
}

#[test]
fn wrong_designations_say_what_would_be_right() {
    let wrong = |text: &str| Section::from_designation(text, TrailingEdge::Published).expect_err(text);
    assert!(matches!(wrong("NACA 44"), SectionError::DigitCount { count: 2, .. }));
    assert!(matches!(wrong("NACA 99999"), SectionError::Thickness { percent: 99, .. }));
    assert!(matches!(wrong("NACA 99912"), SectionError::FiveDigitKind { digit: 9, .. }));
    assert!(matches!(wrong("NACA 29012"), SectionError::FiveDigitPosition { reflexed: false, .. }));
    assert!(matches!(wrong("NACA 21112"), SectionError::FiveDigitPosition { reflexed: true, .. }));
    assert!(matches!(wrong("NACA 03012"), SectionError::DesignLift { .. }));
    assert!(matches!(wrong("NACA 4400"), SectionError::Thickness { percent: 0, .. }));
    assert!(matches!(wrong("NACA 4012"), SectionError::CamberPosition { camber: 4, position: 0, .. }));
    assert!(matches!(wrong("NACA 0412"), SectionError::CamberPosition { camber: 0, position: 4, .. }));
    assert!(matches!(wrong("NACA 9140"), SectionError::Folds { side: "lower", .. }));
    assert!(matches!(wrong("4412"), SectionError::NoFamily { .. }));
    for text in ["", "NACA", "441", "NACA 44x2", "NACA ٤٤١٢", "naca-4412", "é"] {
        assert!(matches!(wrong(text), SectionError::Unknown { .. }), "{text}");
    }
    assert_eq!(published("naca4412"), published(" NACA 4412 "));
}

proptest! {
    /// Whatever is accepted is a closed, plain contour with wood in it.
    #[test]
    fn accepted_sections_are_sound(camber in 0u8..=9, position in 1u8..=9, thickness in 1u32..=40) {
        let digits = if camber == 0 { "00".to_owned() } else { format!("{camber}{position}") };
        let name = format!("NACA {digits}{thickness:02}");
        let Ok(section) = Section::from_designation(&name, TrailingEdge::Published) else {
            // Only the sharp bends of strong camber far forward under great thickness are refused.
            prop_assert!(camber >= 3 && position <= 3 && thickness >= 12, "{} refused", name);
            return Ok(());
        };
        let points = section.points(401);
        prop_assert!(points.iter().all(|p| p.is_finite()));
        let outline = plankform::geometry::ArcPath::polyline(points, true);
        prop_assert!(outline.refuse_crossings(1e-6).is_ok(), "{} crosses itself", name);
        let n = section.numbers();
        prop_assert!(outline.area() > 0.0 && (outline.area() - n.area).abs() < 2e-4);
        // The form itself is 1.000288 times its nominal thickness.
        prop_assert!((n.thickness - 1.000_287_88 * f64::from(thickness) / 100.0).abs() < 1e-6);
    }

    #[test]
    fn any_text_is_answered(text in "\\PC{0,40}") {
        let _ = Section::from_designation(&text, TrailingEdge::Published);
    }
}
