//! Sections from tables of coordinates: they come back as what they were made from.

#[path = "common/coordinates.rs"]
mod coordinates;

use coordinates::{apart, read, section, table};
use plankform::geometry::{Affine, Curve, Jet, Point, Vec2};
use plankform::problems::FileErrors;
use plankform::section::coordinates::{ChordUnit, LARGEST_TABLE, Traced, from_dxf, from_table};
use plankform::section::{Side, TrailingEdge};
use proptest::prelude::*;

const NAMES: [&str; 8] = ["0006", "0012", "0024", "2412", "4412", "4415", "23012", "16-009"];

fn refused(text: &str) -> FileErrors {
    match from_table(text, "table.txt", None) {
        Ok(traced) => panic!("{:?}", traced.report),
        Err(errors) => errors,
    }
}

#[test]
fn tables_of_published_sections_come_back() {
    // Chords, for so many points of a symmetric section and of a cambered one. The latter have a
    // step of the second derivative where the pieces of their mean line join.
    for (count, symmetric, cambered) in
        [(41, 2e-6, 7e-5), (61, 5e-7, 2.5e-5), (81, 2e-7, 1e-5), (101, 1e-7, 1e-5), (201, 1e-8, 3e-6)]
    {
        for name in NAMES {
            for edge in [TrailingEdge::Published, TrailingEdge::Closed] {
                let section = section(name, edge);
                let traced = read(&table(&section.points(count), 12));
                let limit =
                    if name.starts_with("00") || name.starts_with("16") { symmetric } else { cambered };
                let distance = apart(&traced, &section, Affine::IDENTITY);
                assert!(distance < limit, "{name} {edge:?} {count}: {distance:.1e}");
                let report = &traced.report;
                assert!(report.reached && report.greatest_distance < 1e-9, "{name} {count}: {:?}", report);
                assert!(report.waves.is_empty() && report.outliers.is_empty(), "{name} {count}: {report:?}");
                assert_eq!(report.unit, ChordUnit::Chord);
                assert_eq!(report.edge_gap < 1e-9, edge == TrailingEdge::Closed);
            }
        }
    }
}

#[test]
fn five_decimals_give_no_waves_and_stay_within_a_unit() {
    for count in [81, 101, 201] {
        for name in NAMES {
            let section = section(name, TrailingEdge::Published);
            let traced = read(&table(&section.points(count), 5));
            let distance = apart(&traced, &section, Affine::IDENTITY);
            // What as many points give without rounding, and the half unit, with the other half for
            // where the points leave the outline free.
            assert!(distance < 2e-5, "{name} {count}: {distance:.1e}");
            let report = &traced.report;
            assert!((report.resolution.expect("a table") - 1e-5).abs() < 1e-8);
            assert!(report.reached && report.greatest_distance < 0.71e-5, "{name} {count}: {report:?}");
            assert!(report.waves.is_empty() && report.outliers.is_empty(), "{name} {count}: {report:?}");
            let radius = 0.5 * traced.surfaces.at(0.0)[1].powi(2);
            if name.starts_with("00") {
                let published = section.numbers().nose_radius_on_outline;
                assert!((radius / published - 1.0).abs() < 0.02, "{name} {count}: {radius} {published}");
            }
        }
    }
}

/// Ordinates as they were printed: NACA Reports 460, 537 and 824, see the head of the file. Those of
/// the cambered sections were computed by hand and stray by some units of their last digit.
#[test]
fn printed_ordinates_give_the_section() {
    let text = include_str!("reference/sections.toml");
    let reference: toml::Table = text.parse().expect("a table");
    let numbers = |value: &toml::Value| -> Vec<f64> {
        let number = |v: &toml::Value| v.as_float().or(v.as_integer().map(|v| v as f64)).expect("a number");
        value.as_array().expect("a list").iter().map(number).collect()
    };
    for kind in ["symmetric", "cambered"] {
        let group = &reference[kind];
        let stations = numbers(&group["stations"]);
        for printed in group["section"].as_array().expect("sections") {
            let name = printed["name"].as_str().expect("a name");
            let (upper, lower) = if kind == "symmetric" {
                let upper = numbers(&printed["ordinates"]);
                (upper.clone(), upper.iter().map(|y| -y).collect())
            } else {
                (
                    [&[0.0], &numbers(&printed["upper"])[..]].concat(),
                    [&[0.0], &numbers(&printed["lower"])[..]].concat(),
                )
            };
            let stations =
                if stations[0] == 0.0 { stations.clone() } else { [&[0.0], &stations[..]].concat() };
            let block = |heights: &[f64]| -> String {
                stations.iter().zip(heights).map(|(x, y)| format!("{x} {y}\n")).collect()
            };
            let found = read(&format!("NACA {name}\n{}\n{}", block(&upper), block(&lower)));
            let strays = printed.get("strays").and_then(toml::Value::as_float).unwrap_or(0.0) / 100.0;
            let unit = found.report.resolution.expect("a table");
            let distance = apart(&found, &section(name, TrailingEdge::Published), Affine::scale(0.01));
            assert!(distance < 0.5 * unit + strays.max(0.5 * unit), "{name}: {distance:.1e}");
            assert_eq!(found.report.unit, ChordUnit::Percent);
            assert!(found.report.waves.is_empty(), "{name}: {:?}", found.report.waves);
        }
    }
}

/// Points scattered by far more than their digits say: no outline is smooth through them, and the
/// nearest that is stays with them.
#[test]
fn scattered_points_are_followed_and_it_is_said() {
    let mut seed = 7_u64;
    let mut random = || {
        seed = seed.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
        (seed >> 33) as f64 / f64::from(1 << 30) - 1.0
    };
    for name in ["0012", "2412", "23012"] {
        let points = section(name, TrailingEdge::Published).points(61);
        for scatter in [1e-6, 1e-5, 1e-4, 1e-3] {
            for _ in 0..10 {
                let moved: Vec<Point> =
                    points.iter().map(|p| *p + scatter * Vec2::new(random(), random())).collect();
                let report = read(&table(&moved, 7)).report;
                assert!(report.greatest_distance < 3.0 * scatter, "{name} {scatter}: {report:?}");
                let said = report.lines().iter().any(|line| line.contains("Not every point"));
                assert_eq!(said, !report.reached);
                let found = !report.waves.is_empty() || !report.outliers.is_empty();
                assert!(!report.reached || scatter < 1e-4 || found, "{name} {scatter}: {report:?}");
            }
        }
    }
}

fn edited(points: &[Point], edit: impl Fn(usize, Point) -> Point, decimals: usize) -> String {
    let moved: Vec<Point> = points.iter().enumerate().map(|(i, p)| edit(i, *p)).collect();
    table(&moved, decimals)
}

#[test]
fn the_same_section_comes_of_every_way_to_list_it() {
    let section = section("2412", TrailingEdge::Published);
    let points = section.points(101);
    let plain = read(&table(&points, 12));
    let chord = plain.report.placing.chord();
    let same = |text: &str, what: &str| {
        let traced = read(text);
        for i in -200..=200 {
            let t = f64::from(i) / 200.0;
            let (a, b) = (traced.surfaces.at(t), plain.surfaces.at(t));
            assert!((a[0] - b[0]).abs() < 2e-9, "{what} at {t}: {} {}", a[0], b[0]);
        }
        traced
    };
    let reversed: Vec<Point> = points.iter().rev().copied().collect();
    let (upper, lower) = (&points[..=50], &points[50..]);
    let turned = |points: &[Point]| points.iter().rev().copied().collect::<Vec<_>>();

    let traced = same(&table(&reversed, 12), "reversed");
    assert!(!traced.report.upper_first && plain.report.upper_first);
    let text = format!(
        "# drawn by hand\nMy section 2412\n\n{}% end\n",
        table(&points, 12).replace('\n', " # x y\n")
    );
    let traced = same(&text, "title and comments");
    assert_eq!(traced.report.title.as_deref(), Some("My section 2412"));
    assert!(traced.report.lines()[0].contains("My section 2412"));
    for divider in ["\t", ", ", ";", "   ", ",", " ; "] {
        same(&table(&points, 12).replace(' ', divider), divider);
    }
    let traced = same(
        &table(&points, 12).replace('.', ",").replace(' ', "; ").replace('\n', "\r\n"),
        "decimal commas",
    );
    assert!(traced.report.decimal_comma);

    let blocks = |one: &[Point], two: &[Point], between: &str| table(one, 12) + between + &table(two, 12);
    for between in ["", "\n", "\n\n# lower\n"] {
        let traced = same(&blocks(&turned(upper), lower, between), "two blocks from the nose");
        assert!(traced.report.blocks == 2 && traced.report.from_nose && traced.report.upper_first);
        let traced = same(&blocks(upper, &turned(lower), between), "two blocks from the tail");
        assert!(traced.report.blocks == 2 && !traced.report.from_nose);
        let traced = same(&blocks(lower, &turned(upper), between), "the lower first");
        assert!(traced.report.blocks == 2 && !traced.report.upper_first);
    }
    assert_eq!(same(&blocks(upper, lower, "\n"), "over the nose").report.duplicates, [52]);
    let counted = format!("Mine\n51. 51.\n\n{}", blocks(&turned(upper), lower, "\n"));
    assert_eq!(same(&counted, "counts").report.blocks, 2);
    let from_nose = [lower, &turned(upper).into_iter().rev().collect::<Vec<_>>()].concat();
    assert!(same(&table(&from_nose, 12), "round from the nose").report.from_nose);

    for (scale, unit) in [(100.0, ChordUnit::Percent), (137.5, ChordUnit::AssumedMillimetres)] {
        let traced = same(&edited_by(&points, Affine::scale(scale), 12), "scaled");
        assert_eq!(traced.report.unit, unit);
        assert!((traced.report.placing.chord() - scale * chord).abs() < 1e-7);
    }
    let place = Affine::translate((30.0, -20.0)) * Affine::rotate(5_f64.to_radians()) * Affine::scale(150.0);
    let traced = same(&edited_by(&points, place, 12), "placed");
    let (found, level) = (traced.report.placing, plain.report.placing);
    assert!((found.rotation() - level.rotation() - 5_f64.to_radians()).abs() < 1e-9);
    assert!((found.chord() - 150.0 * level.chord()).abs() < 1e-7);
    assert!(found.nose().distance(place * level.nose()) < 1e-6);
    assert!(traced.report.lines().iter().any(|line| line.contains("degrees")));
    let seen = found.to_chord(found.to_file(Point::new(0.3, 0.1)));
    assert!(seen.distance(Point::new(0.3, 0.1)) < 1e-12);

    let traced = same(&edited(&points, |_, p| Point::new(1.0 - p.x, p.y), 12), "mirrored");
    assert!(traced.report.placing.mirrored());
    assert!(traced.report.placing.nose().distance(Point::new(1.0, 0.0)) < 0.01);
}

fn edited_by(points: &[Point], place: Affine, decimals: usize) -> String {
    edited(points, |_, p| place * p, decimals)
}

/// The outline as a curve, to hold its curvature against differences of its tangent.
struct Outline<'a>(&'a Traced);

impl Curve for Outline<'_> {
    fn jet(&self, t: f64) -> Jet {
        let [y, first, second] = self.0.surfaces.at(t);
        Jet { point: Point::new(t * t, y), first: Vec2::new(2.0 * t, first), second: Vec2::new(2.0, second) }
    }

    fn breaks(&self) -> Vec<f64> {
        self.0.surfaces.knots().to_vec()
    }
}

#[test]
fn curvature_is_continuous_through_the_nose_and_over_the_knots() {
    for name in NAMES {
        for decimals in [5, 12] {
            let traced = read(&table(&section(name, TrailingEdge::Published).points(81), decimals));
            let curve = Outline(&traced);
            let knots = curve.breaks();
            assert!(knots.contains(&0.0) && knots.first() == Some(&-1.0) && knots.last() == Some(&1.0));
            assert!(knots.windows(2).all(|pair| pair[0] < pair[1]));
            let greatest = curve.jet(0.0).curvature();
            assert!(greatest > 1.0);
            for &knot in &knots[1..knots.len() - 1] {
                let (before, behind) = (curve.jet(knot - 1e-9), curve.jet(knot + 1e-9));
                let step = (before.curvature() - behind.curvature()).abs();
                assert!(step < 1e-5 * greatest, "{name} {decimals} at {knot}: {step}");
                // And it is the turn of the tangent, from differences of it.
                let (from, to) = (curve.jet(knot - 1e-5), curve.jet(knot + 1e-5));
                let turn = from.first.cross(to.first).atan2(from.first.dot(to.first));
                let measured = turn / from.point.distance(to.point);
                assert!((measured - behind.curvature()).abs() < 2e-3 * greatest, "{name} at {knot}");
            }
            // The nose is the furthest from the trailing edge, and the chord is the x axis.
            let tail = Point::new(1.0, 0.0);
            for i in -500..=500 {
                let point = curve.jet(f64::from(i) / 500.0).point;
                assert!(point.distance(tail) <= 1.0 + 1e-12, "{name}: {point:?}");
            }
            let [up, down] = [-1.0, 1.0].map(|t| traced.surfaces.at(t)[0]);
            assert!((up + down).abs() < 1e-12 && traced.surfaces.at(0.0)[0].abs() < 1e-15);
            for t in [-0.7, -0.2, 0.15, 0.6] {
                let [_, first, second] = traced.surfaces.at(t);
                let (low, high) = (traced.surfaces.at(t - 1e-5), traced.surfaces.at(t + 1e-5));
                assert!(((high[0] - low[0]) / 2e-5 - first).abs() < 1e-7);
                assert!(((high[1] - low[1]) / 2e-5 - second).abs() < 1e-5);
            }
        }
    }
    let flat = read(&table(&section("0012", TrailingEdge::Closed).points(81), 8));
    assert_eq!(flat.surfaces.at(7.0), flat.surfaces.at(1.0));
    assert!(flat.surfaces.at(f64::NAN)[0].is_nan());
}

#[test]
fn a_slip_is_found_at_its_point() {
    for name in ["0012", "4412", "23012", "16-009"] {
        let points = section(name, TrailingEdge::Published).points(101);
        for (slip, size) in [(12, 3e-4), (30, -1e-3), (44, 4e-4), (57, 1e-3), (77, -2e-4), (90, 5e-4)] {
            for decimals in [5, 12] {
                let text =
                    edited(&points, |i, p| if i == slip { p + Vec2::new(0.0, size) } else { p }, decimals);
                let traced = read(&format!("a title\n{text}"));
                let outliers = &traced.report.outliers;
                assert_eq!(outliers.len(), 1, "{name} {slip} {decimals}: {outliers:?}");
                assert_eq!((outliers[0].index, outliers[0].line), (slip + 1, Some(slip + 2)), "{name}");
                let side = if slip < 50 { Side::Upper } else { Side::Lower };
                assert_eq!(outliers[0].side, side);
                assert!((outliers[0].distance / size.abs() - 1.0).abs() < 0.3, "{name} {slip}: {outliers:?}");
                // It is said, and it is kept.
                let said = format!("Point {} (line {})", slip + 1, slip + 2);
                assert!(traced.report.lines().iter().any(|line| line.contains(&said)));
                assert_eq!(traced.points.len(), points.len());
            }
        }
    }
}

#[test]
fn a_wave_is_found_at_its_place() {
    for name in ["0012", "2412", "23012"] {
        let section = section(name, TrailingEdge::Published);
        for (side, place) in [(Side::Upper, 0.3), (Side::Upper, 0.6), (Side::Lower, 0.5)] {
            let points = section.points(161);
            // One bump of 4e-4 chord, some 6 % of the chord long: smooth, and over many points.
            let bump = |i: usize, p: Point| {
                let here = (i <= 80) == (side == Side::Upper);
                let height = 4e-4 * (-((p.x - place) / 0.012).powi(2)).exp();
                if here { p + Vec2::new(0.0, height) } else { p }
            };
            let traced = read(&edited(&points, bump, 7));
            let waves = &traced.report.waves;
            assert_eq!(waves.len(), 1, "{name} {side:?} {place}: {waves:?}");
            let wave = waves[0];
            assert_eq!(wave.side, side);
            assert!(wave.from < place + 0.03 && wave.to > place - 0.03, "{name}: {wave:?}");
            let near = points[wave.index - 1];
            assert!((near.x - place).abs() < 0.03, "{name}: {wave:?}");
            assert!(wave.amplitude > 2e-5 && wave.amplitude < 4e-4, "{wave:?}");
            assert!(traced.report.lines().iter().any(|line| line.contains("wave")));
        }
    }
}

#[test]
fn a_tolerance_takes_the_wave_of_rounding_out() {
    // Rounded to four decimals, and printed as if it were good to eight.
    let points = section("0012", TrailingEdge::Published).points(121);
    let coarse = |_, p: Point| Point::new((p.x * 1e4).round() / 1e4, (p.y * 1e4).round() / 1e4);
    let text = edited(&points, coarse, 8);
    let taken_at_its_word = read(&text);
    assert!((taken_at_its_word.report.resolution.expect("a table") - 1e-8).abs() < 1e-10);
    let eased = from_table(&text, "t", Some(1e-4)).expect("a section");
    assert!(eased.report.reached && eased.report.greatest_distance <= 1.01e-4);
    assert!(eased.report.waves.is_empty(), "{:?}", eased.report.waves);
    assert!(eased.report.greatest_distance > taken_at_its_word.report.greatest_distance);
    for bad in [0.0, -1.0, 0.02, f64::NAN, f64::INFINITY] {
        assert!(from_table(&text, "t", Some(bad)).is_err_and(|e| e.to_string().contains("tolerance")));
    }
}

#[test]
fn ends_that_passed_each_other_are_joined_and_it_is_said() {
    let mut points = section("0012", TrailingEdge::Closed).points(81);
    points[0].y = -4e-5;
    points[80].y = 3e-5;
    let found = read(&table(&points, 7));
    assert!((found.report.joined - 7e-5).abs() < 1e-8 && found.report.edge_gap < 1e-12);
    assert!((found.surfaces.at(-1.0)[0] - found.surfaces.at(1.0)[0]).abs() < 1e-9);
    assert!(found.report.lines().iter().any(|line| line.contains("passed each other by 0.007 %")));
    for point in &mut points[..40] {
        point.y -= 0.02 * point.x.powi(8);
    }
    assert!(refused(&table(&points, 7)).to_string().contains("crosses itself"));
}

#[test]
fn digits_are_understood_as_they_are_printed() {
    let points = section("0012", TrailingEdge::Published).points(81);
    let unit = |text: &str| read(text).report.resolution.expect("a table");
    // Noughts at the end left out: still five decimals.
    let short: String = points
        .iter()
        .map(|p| format!("{} {}\n", (p.x * 1e5).round() / 1e5, (p.y * 1e5).round() / 1e5))
        .collect();
    assert!((unit(&short) - 1e-5).abs() < 1e-8);
    // So many digits in each: the unit of the greatest heights, 0.06.
    let digits: String = points.iter().map(|p| format!("{:.5e} {:.5e}\n", p.x, p.y)).collect();
    assert!((unit(&digits) - 1e-7).abs() < 1e-10, "{}", unit(&digits));
    let percent = edited_by(&points, Affine::scale(100.0), 3);
    assert!((unit(&percent) - 1e-5).abs() < 1e-8);
}

#[test]
fn what_is_wrong_with_a_table_is_marked_where_it_stands() {
    let points = section("2412", TrailingEdge::Published).points(61);
    let good = table(&points, 6);
    let replaced = |line: usize, with: &str| {
        let lines: Vec<&str> =
            good.lines().enumerate().map(|(i, old)| if i == line { with } else { old }).collect();
        lines.join("\n")
    };
    let swapped = |a: usize, b: usize| {
        let mut lines: Vec<&str> = good.lines().collect();
        lines.swap(a, b);
        lines.join("\n")
    };
    let crossed =
        edited(&points, |i, p| if (1..25).contains(&i) { Point::new(p.x, -p.y - 0.05) } else { p }, 6);
    let no_nose: Vec<Point> = points.iter().copied().filter(|p| p.x > 0.12 || p.y.abs() < 0.001).collect();
    let gap: Vec<Point> = points.iter().copied().filter(|p| p.y < 0.0 || p.x < 0.02 || p.x > 0.6).collect();
    let stepped = edited(&points, |i, p| if i < 15 { p + Vec2::new(0.0, 0.06) } else { p }, 6);
    for (text, line, says) in [
        (replaced(7, "0.9 nan"), 8, "not a finite number"),
        (replaced(7, "inf 0.1"), 8, "not a finite number"),
        (replaced(7, "1e999 0.1"), 8, "not a finite number"),
        (replaced(7, "0.93"), 8, "one number"),
        (replaced(7, "0.93 0.01 0.0"), 8, "more than two numbers"),
        (replaced(7, "0,93,0.01"), 8, "three numbers"),
        (replaced(7, "here is text"), 8, "text among the points"),
        (replaced(7, "0.9 0.1x"), 8, "text among the points"),
        (swapped(12, 14), 14, "turns back"),
        (crossed, 0, "crosses itself"),
        (stepped, 0, "steps at point"),
        (table(&no_nose, 6), 0, "too few points"),
        (table(&gap, 6), 0, "nothing between points"),
        (table(&points[..25], 6), 25, "must lie at the trailing edge"),
        (table(&points[..6], 6), 6, "6 points"),
        (String::new(), 1, "0 points"),
        ("1 0\n".repeat(30), 0, "enclose nothing"),
        (
            (-15..=15_i32).map(|i| format!("{} 0\n", f64::from(i.abs()) / 15.0)).collect(),
            0,
            "enclose nothing",
        ),
        (replaced(7, "1e12 0.1"), 8, "below 1e9"),
        (format!("40. 30.\n{good}"), 1, "gives 40 and 30 points, and 61 follow"),
        ("line\n".repeat(50), 21, "more text here"),
        ("0.5 0.1\n".repeat(LARGEST_TABLE / 8 + 1), 1, "bytes"),
        ("0.5 0.1\n".repeat(20_001), 20_001, "20001 points"),
    ] {
        let errors = refused(&text);
        let problem = &errors.problems()[0];
        assert!(problem.message.contains(says), "{says}: {errors}");
        assert!(line == 0 || problem.line == line, "{says}: {errors}");
        assert!(errors.to_string().contains("table.txt"));
    }
    // Each of several faults is told.
    let three = replaced(7, "0.9 nan").replacen("\n0.9", "\nx 0.9", 2);
    assert_eq!(refused(&three).problems().len(), 3);
}

#[test]
fn a_sharp_or_bare_nose_is_refused() {
    // Two wedges.
    let wedge: String = (-40..=40_i32)
        .map(|i| {
            let x = f64::from(i.abs()) / 40.0;
            let y = 0.1 * x.min(1.0 - x) * -f64::from(i.signum());
            format!("{x:.5} {y:.5}\n")
        })
        .collect();
    let error = refused(&wedge).to_string();
    assert!(error.contains("nose is sharp") || error.contains("no smooth outline"), "{error}");
    let points = section("0012", TrailingEdge::Closed).points(61);
    let bare: Vec<Point> = points.iter().copied().filter(|p| p.x > 0.06 || p.x < 1e-9).collect();
    let error = refused(&table(&bare, 6)).to_string();
    assert!(error.contains("too few points"), "{error}");
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(200))]

    #[test]
    fn any_text_is_read_or_refused(text in ".{0,300}", numbers in "([-0-9.,;e]{0,8}[ \t\n]){0,80}") {
        for text in [text, numbers] {
            if let Err(errors) = from_table(&text, "t", None) {
                prop_assert!(!errors.problems().is_empty() && !errors.to_string().is_empty());
            }
            prop_assert!(from_dxf(text.as_bytes(), "t", None).is_err());
        }
    }

    /// Points of any kind: in any order, close together, over one another.
    #[test]
    fn any_points_are_followed_or_refused(
        points in proptest::collection::vec((-1.0..2.0_f64, -0.3..0.3_f64), 10..60),
        sorted in any::<bool>(),
        scale in prop_oneof![Just(1.0), Just(1e-5), Just(1e6)],
    ) {
        let mut points = points;
        if sorted {
            points.sort_by(|a, b| a.0.total_cmp(&b.0));
        }
        let text: String = points.iter().map(|(x, y)| format!("{:?} {:?}\n", x * scale, y * scale)).collect();
        if let Ok(traced) = from_table(&text, "t", None) {
            prop_assert!((-20..=20).all(|i| traced.surfaces.at(f64::from(i) / 20.0).iter().all(|v| v.is_finite())));
        }
    }

    /// Sections with errors of all sizes on their points.
    #[test]
    fn rough_sections_are_followed_or_refused(
        noise in proptest::collection::vec((-1.0..1.0_f64, -1.0..1.0_f64), 61),
        power in -7.0..-1.0_f64,
        decimals in 2..9_usize,
    ) {
        let size = 10_f64.powf(power);
        let points = section("2412", TrailingEdge::Published).points(61);
        let text = edited(&points, |i, p| p + size * Vec2::new(noise[i].0, noise[i].1), decimals);
        if let Ok(traced) = from_table(&text, "t", None) {
            let report = &traced.report;
            prop_assert!(report.greatest_distance.is_finite() && !report.lines().is_empty());
            prop_assert!((-20..=20).all(|i| traced.surfaces.at(f64::from(i) / 20.0).iter().all(|v| v.is_finite())));
        } else {
            prop_assert!(size > 1e-5 || decimals < 4, "{size} {decimals}: {}", from_table(&text, "t", None).unwrap_err());
        }
    }
}

/// A line that only names the columns is no title; one that says more is.
#[test]
fn names_of_columns_are_no_title() {
    let rows: String = (0..=40)
        .map(|i| {
            let root = 1.0 - f64::from(i) / 20.0;
            let x = root * root;
            format!("{x:.6} {:.6}\n", 0.15 * root * (1.0 - x))
        })
        .collect();
    for (head, title) in [
        ("x y\n", None),
        ("X/c; Y/c\n", None),
        ("x_mm\ty_mm\n", None),
        ("xenon yacht section of the scow\n", Some("xenon yacht section of the scow")),
        ("", None),
    ] {
        let traced = from_table(&format!("{head}{rows}"), "t.txt", None).unwrap_or_else(|e| panic!("{e}"));
        assert_eq!(traced.report.title.as_deref(), title, "{head}");
    }
}
