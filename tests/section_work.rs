//! Sections that are worked, blended, written as surfaces or have a flap deflected.

use plankform::flow::{Panelling, PotentialFlow, hinge_moment};
use plankform::geometry::{ArcPath, Curve, Point, Vec2};
use plankform::section::{
    Beside, Flap, FlapSurface, HingeHeight, MeanLine, Section, SectionError, Side, ThicknessForm,
    TrailingEdge, UniformLoad, Work,
};
use proptest::prelude::*;

fn published(designation: &str) -> Section {
    Section::from_designation(designation, TrailingEdge::Published).expect(designation)
}

fn file(text: &str) -> Section {
    Section::from_file_text(text, "mine.toml").unwrap_or_else(|errors| panic!("{errors}"))
}

/// A member of the four-digit family with any camber, position and thickness.
fn member(camber: f64, position: f64, thickness: f64) -> Result<Section, SectionError> {
    let line = MeanLine::FourDigit { camber, position };
    let form = ThicknessForm::four_digit(thickness, TrailingEdge::Published);
    Section::new("member".to_owned(), line, form)
}

/// The 0012 as two surfaces, from NACA Report 460.
const SURFACES: &str = "name = \"Surfaces\"
upper = \"0.6*(0.2969*sqrt(x) - 0.1260*x - 0.3516*x^2 + 0.2843*x^3 - 0.1015*x^4)\"
lower = \"-0.6*(0.2969*sqrt(x) - 0.1260*x - 0.3516*x^2 + 0.2843*x^3 - 0.1015*x^4)\"
";

fn flap(angle: f64, height: HingeHeight, surface: FlapSurface) -> Flap {
    Flap { hinge: 0.7, height, angle: angle.to_radians(), surface }
}

/// Sections of every making.
fn of_every_making() -> Vec<Section> {
    let cambered = published("NACA 4412");
    let modified = published("NACA 0010-35");
    let blend = Section::blend("blend".to_owned(), &cambered, &modified, 0.3).expect("a blend");
    let worked = Work {
        thickness: Some(0.1),
        thickness_at: Some(0.38),
        camber: Some(0.03),
        camber_at: Some(0.45),
        trailing_edge: Some(0.01),
        edge_from: 0.65,
    };
    let broken = FlapSurface::Broken;
    let smooth = FlapSurface::Smooth { over: 0.15 };
    vec![
        file(SURFACES),
        cambered.worked(&worked).expect("a worked section"),
        file(SURFACES).worked(&Work { trailing_edge: Some(0.0), ..Work::NONE }).expect("a closed one"),
        blend.worked(&worked).expect("a worked blend"),
        cambered.flapped(flap(12.0, HingeHeight::Middle, broken)).expect("a flap"),
        cambered.flapped(flap(-12.0, HingeHeight::Upper, broken)).expect("a flap"),
        cambered.flapped(flap(20.0, HingeHeight::Lower, broken)).expect("a flap"),
        blend.flapped(flap(15.0, HingeHeight::Upper, smooth)).expect("a flap"),
        cambered,
        blend,
    ]
}

/// Every outline states its own derivatives, and meets itself at its breaks.
#[test]
fn derivatives_are_those_of_the_outline() {
    for section in of_every_making() {
        for ends in section.breaks().windows(2) {
            for share in [0.07, 0.31, 0.5, 0.77, 0.96] {
                let t = ends[0] + share * (ends[1] - ends[0]);
                let step = 1e-4 * (ends[1] - ends[0]);
                let at = |k: f64| section.jet(t + k * step);
                // Central differences of the fourth order.
                let rate = |of: &dyn Fn(f64) -> Vec2| {
                    (8.0 * (of(1.0) - of(-1.0)) - (of(2.0) - of(-2.0))) / (12.0 * step)
                };
                let first = rate(&|k| at(k).point.to_vec2());
                let second = rate(&|k| at(k).first);
                let jet = section.jet(t);
                let (off, off_second) = ((first - jet.first).hypot(), (second - jet.second).hypot());
                assert!(off < 1e-8 * (1.0 + jet.first.hypot()), "{} at {t}: {off:e}", section.name());
                assert!(
                    off_second < 1e-6 * (1.0 + jet.second.hypot()),
                    "{} at {t}: {off_second:e}",
                    section.name()
                );
            }
        }
        for three in section.breaks().windows(3) {
            let gap = section.jet(three[1] - 1e-12).point.distance(section.jet(three[1] + 1e-12).point);
            assert!(gap < 1e-10, "{} is torn at {}: {gap:e}", section.name(), three[1]);
        }
        let n = section.numbers();
        // A closed edge is one point and not two.
        let points = section.points(4001).into_iter().skip(usize::from(section.edge_word() == "closed"));
        let outline = ArcPath::polyline(points, true);
        assert!(outline.refuse_crossings(1e-7).is_ok(), "{} crosses itself", section.name());
        assert!((outline.area() - n.area).abs() < 1e-5, "{}: {} {}", section.name(), outline.area(), n.area);
    }
}

#[test]
fn surfaces_give_the_section_whose_surfaces_they_are() {
    let (ours, published) = (file(SURFACES), published("NACA 0012"));
    for (a, b) in ours.points(401).into_iter().zip(published.points(401)) {
        assert!(a.distance(b) < 1e-14, "{a:?} {b:?}");
    }
    let (a, b) = (ours.numbers(), published.numbers());
    assert!((a.thickness - b.thickness).abs() < 1e-14 && (a.nose_radius - b.nose_radius).abs() < 1e-14);
    assert_eq!((ours.edge_word(), a.camber), ("open", 0.0));
}

#[test]
fn surfaces_that_are_none_are_refused_where_they_are_wrong() {
    let says = |upper: &str, lower: &str| {
        let text = format!("name = \"a\"\nupper = \"{upper}\"\nlower = \"{lower}\"\n");
        Section::from_file_text(&text, "a.toml").expect_err(&text).to_string()
    };
    let good = "-0.1*sqrt(x)*(1 - x)";
    for (upper, lower, says_what, place) in [
        ("0.1*sqrt(x)*(1 - x) + 0.01", good, "must be 0 there", "a.toml:2:9"),
        ("0.1*sqrt(x)*(1 - x)", "0.1*x", "the thickness is negative", "a.toml:2:9"),
        ("-0.2*sqrt(x)*(1 - x)", good, "the thickness is negative", "a.toml:2:9"),
        ("0.1*x*(1 - x)", "-0.1*x*(1 - x)", "the nose is sharp", "a.toml:2:9"),
        (
            "0.1*sqrt(x)*(1 - x) + 0.02*x",
            "0.01*x - 0.1*sqrt(x)*(1 - x)",
            "the trailing edge goes from",
            "a.toml:2:9",
        ),
        ("0.1*sqrt(x)", "0.1*sqrt(x - 0.5)", "no finite value", "a.toml:3:9"),
        ("0.1*sqrt(x)*sqrt(1 - x)", good, "no finite value at 100.00 %", "a.toml:2:9"),
        ("0.1*sqrt(x)*(1 - x) + 0.01*floor(x)", good, "floor", "a.toml:2:"),
    ] {
        let found = says(upper, lower);
        assert!(found.contains(says_what) && found.contains(place), "{found}");
    }
    let one = Section::from_file_text("name = \"a\"\nupper = \"0.1*sqrt(x)\"\n", "a.toml").expect_err("one");
    assert!(one.to_string().contains("lower is missing"), "{one}");
    let both = format!("{SURFACES}thickness = \"0.3*sqrt(x)*(1 - x)\"\n");
    let both = Section::from_file_text(&both, "a.toml").expect_err("both");
    assert!(both.to_string().contains("a section comes from one of them"), "{both}");
}

/// The thickness is proportional in the family, so that a scaled member is another.
#[test]
fn scaling_stays_in_the_family() {
    let scaled = published("NACA 0012").worked(&Work { thickness: Some(0.09 * 1.000_287_884), ..Work::NONE });
    let (scaled, published_9) = (scaled.expect("a section"), published("NACA 0009"));
    for (a, b) in scaled.points(201).into_iter().zip(published_9.points(201)) {
        assert!(a.distance(b) < 1e-9, "{a:?} {b:?}");
    }
    let scaled =
        published("NACA 4412").worked(&Work { camber: Some(0.02), ..Work::NONE }).expect("a section");
    for (a, b) in scaled.points(201).into_iter().zip(published("NACA 2412").points(201)) {
        assert!(a.distance(b) < 1e-12, "{a:?} {b:?}");
    }
    let mid = Section::blend("mid".to_owned(), &published("NACA 0010"), &published("NACA 0014"), 0.5);
    for (a, b) in mid.expect("a blend").points(201).into_iter().zip(published("NACA 0012").points(201)) {
        assert!(a.distance(b) < 1e-15, "{a:?} {b:?}");
    }
    for weight in [-0.1, 1.1, f64::NAN] {
        let blend = Section::blend("no".to_owned(), &published("NACA 0010"), &published("NACA 0014"), weight);
        assert!(matches!(blend, Err(SectionError::BlendWeight { .. })));
    }
}

#[test]
fn an_opened_edge_leaves_the_rest_as_it_was() {
    let before = published("NACA 4412");
    let work = Work { trailing_edge: Some(0.012), edge_from: 0.7, ..Work::NONE };
    let after = before.worked(&work).expect("a section");
    assert!((after.numbers().trailing_edge_thickness - 0.012).abs() < 1e-11);
    assert_eq!(after.edge_word(), "open");
    let root = 0.7_f64.sqrt();
    for t in [-root, root] {
        for share in [0.0, 0.3, 0.9, 1.0] {
            assert_eq!(before.jet(share * t).point, after.jet(share * t).point);
        }
        let (inner, outer) = (after.jet(t * (1.0 - 1e-9)), after.jet(t * (1.0 + 1e-9)));
        assert!((inner.curvature() - outer.curvature()).abs() < 1e-6);
    }
    let closed = before.worked(&Work { trailing_edge: Some(0.0), ..Work::NONE }).expect("a section");
    assert!(closed.numbers().trailing_edge_thickness < 1e-11 && closed.edge_word() == "closed");
}

#[test]
fn what_cannot_be_had_is_said() {
    let says = |section: &Section, work: Work| section.worked(&work).expect_err("refused").to_string();
    let (symmetric, cambered) = (published("NACA 0012"), published("NACA 4412"));
    for (section, work, what) in [
        (&symmetric, Work { camber: Some(0.02), ..Work::NONE }, "no camber"),
        (&symmetric, Work { camber_at: Some(0.3), ..Work::NONE }, "no camber"),
        (&cambered, Work { thickness: Some(0.6), ..Work::NONE }, "thickness is to be 60 %"),
        (&cambered, Work { thickness: Some(f64::NAN), ..Work::NONE }, "thickness"),
        (&cambered, Work { thickness_at: Some(0.85), ..Work::NONE }, "stretched more than 5 times"),
        (&cambered, Work { camber_at: Some(0.06), ..Work::NONE }, "stretched more than 5 times"),
        (&cambered, Work { edge_from: 2.0, ..Work::NONE }, "edge-from is to be 200 %"),
    ] {
        assert!(says(section, work).contains(what), "{}", says(section, work));
    }
    for (flap, what) in [
        (Flap { hinge: 0.1, ..flap(5.0, HingeHeight::Middle, FlapSurface::Broken) }, "hinge is at 0.1"),
        (flap(70.0, HingeHeight::Middle, FlapSurface::Broken), "60° at most"),
        (flap(f64::NAN, HingeHeight::Middle, FlapSurface::Broken), "cannot turn"),
        (flap(10.0, HingeHeight::Middle, FlapSurface::Smooth { over: 0.9 }), "there is room for"),
        (flap(50.0, HingeHeight::Middle, FlapSurface::Smooth { over: 0.01 }), "folds"),
    ] {
        let error = cambered.flapped(flap).expect_err(what).to_string();
        assert!(error.contains(what), "{error}");
    }
}

/// A broken flap is a rigid turn behind the hinge and nothing ahead of it.
#[test]
fn a_flap_turns_as_one_piece() {
    let straight = published("NACA 2412");
    for height in [HingeHeight::Upper, HingeHeight::Middle, HingeHeight::Lower] {
        for angle in [-40.0, -10.0, -0.5, 0.5, 10.0, 40.0] {
            let flapped = straight.flapped(flap(angle, height, FlapSurface::Broken)).expect("a flap");
            let axis = {
                let [upper, lower] = [Side::Upper, Side::Lower].map(|side| straight.surface(side, 0.7));
                let y = match height {
                    HingeHeight::Upper => upper,
                    HingeHeight::Middle => 0.5 * (upper + lower),
                    HingeHeight::Lower => lower,
                };
                Point::new(0.7, y)
            };
            for t in [-1.0, 1.0] {
                let (before, after) = (straight.jet(t).point - axis, flapped.jet(t).point - axis);
                let turned = (before.cross(after)).atan2(before.dot(after)).to_degrees();
                assert!((before.hypot() - after.hypot()).abs() < 1e-12);
                // Trailing edge down is clockwise.
                assert!((turned + angle).abs() < 1e-9, "{angle}: {turned}");
            }
            for t in [-0.5, -0.1, 0.0, 0.3, 0.6] {
                assert_eq!(straight.jet(t).point, flapped.jet(t).point);
            }
            let outline = ArcPath::polyline(flapped.points(2001), true);
            assert!(outline.refuse_crossings(1e-7).is_ok(), "{height:?} {angle}");
        }
    }
    let none = straight.flapped(flap(0.0, HingeHeight::Middle, FlapSurface::Broken)).expect("a flap");
    for (a, b) in none.points(301).into_iter().zip(straight.points(301)) {
        assert!(a.distance(b) < 1e-15);
    }
}

/// Up and down are alike on a symmetric section.
#[test]
fn flaps_up_and_down_mirror_each_other() {
    let straight = published("NACA 0012");
    for surface in [FlapSurface::Broken, FlapSurface::Smooth { over: 0.2 }] {
        let [down, up] = [15.0, -15.0]
            .map(|angle| straight.flapped(flap(angle, HingeHeight::Middle, surface)).expect("a flap"));
        for i in 0..=200 {
            let t = f64::from(i) / 100.0 - 1.0;
            let (a, b) = (down.jet(t).point, up.jet(-t).point);
            assert!((a.x - b.x).abs() < 1e-13 && (a.y + b.y).abs() < 1e-13, "{surface:?} {t}");
        }
    }
}

/// Curvature runs on through a smooth bend, and the bend ends at the angle asked.
#[test]
fn a_smooth_bend_has_no_corner() {
    let straight = published("NACA 0012");
    let bent =
        straight.flapped(flap(20.0, HingeHeight::Middle, FlapSurface::Smooth { over: 0.2 })).expect("a flap");
    for three in bent.breaks().windows(3).filter(|three| three[1].abs() > 0.1 && three[1].abs() < 0.999) {
        let [before, after] = [-1e-9, 1e-9].map(|nudge| bent.jet(three[1] + nudge));
        assert!((before.curvature() - after.curvature()).abs() < 1e-5, "{}", three[1]);
    }
    let (a, b) = (straight.jet(-1.0), bent.jet(-1.0));
    let turned = a.first.cross(b.first).atan2(a.first.dot(b.first)).to_degrees();
    assert!((turned + 20.0).abs() < 1e-9, "{turned}");
}

/// Thin-section theory of a plate with a flap: lift, zero-lift angle, moment and hinge moment, each a
/// derivative by flap angle or incidence.
#[derive(serde::Deserialize)]
struct Plate {
    x_h: f64,
    effectiveness: f64,
    dcl_deta: f64,
    dcm_c4_deta: f64,
    b_alpha: f64,
    b_eta: f64,
}

/// H. Glauert, "Theoretical relationships for an aerofoil with hinged flap", ARC R&M 1095 (1927); the
/// values of the plate in `tests/reference/theory.toml`. A section 1 % thick lifts about 0.8 % more.
#[test]
fn flaps_of_thin_sections_follow_thin_section_theory() {
    #[derive(serde::Deserialize)]
    struct Flaps {
        hinge: Vec<Plate>,
    }
    #[derive(serde::Deserialize)]
    struct Theory {
        flap: Flaps,
    }
    let theory: Theory = toml::from_str(include_str!("reference/theory.toml")).expect("the reference tables");
    let thin = Section::from_designation("NACA 0001", TrailingEdge::Closed).expect("a section");
    let flow = |section: &Section| {
        PotentialFlow::new(&Panelling::of(section, 400).expect("panels")).expect("a flow")
    };
    let straight = flow(&thin);
    for plate in theory.flap.hinge {
        let angle = 2.0_f64.to_radians();
        let flap =
            Flap { hinge: plate.x_h, height: HingeHeight::Middle, angle, surface: FlapSurface::Broken };
        let flapped = flow(&thin.flapped(flap).expect("a flap"));
        let axis = Point::new(plate.x_h, 0.0);
        let (level, raised) = (flapped.at(0.0), straight.at(1.0_f64.to_radians()));
        let hinge = |s: &plankform::flow::Solution| hinge_moment(&s.pressure, axis).expect("a moment");
        let off = |ours: f64, theory: f64| 100.0 * (ours / theory - 1.0);
        let found = [
            ("zero lift", off(-flapped.zero_lift() / angle, plate.effectiveness), 1.5),
            ("lift", off(level.cl / angle, plate.dcl_deta), 1.5),
            ("moment", off(level.cm / angle, plate.dcm_c4_deta), 1.5),
            ("hinge moment by flap", off(hinge(&level) / angle, plate.b_eta), 3.0),
            ("hinge moment by incidence", off(hinge(&raised) / 1.0_f64.to_radians(), plate.b_alpha), 3.0),
        ];
        for (what, percent, within) in found {
            println!("hinge at {}: {what} {percent:+.2} %", plate.x_h);
            assert!(percent.abs() < within, "{} {what}: {percent} %", plate.x_h);
        }
    }
}

/// Second moments, area and nose of y = ±k √x (1 - x) in closed form: integrals of Euler's beta kind.
#[test]
fn numbers_agree_with_closed_forms() {
    let k: f64 = 0.15;
    let section = file("name = \"closed form\"\nthickness = \"0.3*sqrt(x)*(1 - x)\"\n");
    let n = section.numbers();
    // ∫ x^a (1 - x)^b dx for the exponents that come up.
    let beta =
        |a: f64, b: i32| (1..=b).fold(1.0 / (a + 1.0), |v, j| v * f64::from(j) / (a + 1.0 + f64::from(j)));
    let area = 2.0 * k * beta(0.5, 1);
    let centroid = 2.0 * k * beta(1.5, 1) / area;
    let about_x = 2.0 * k.powi(3) / 3.0 * beta(1.5, 3);
    let about_y = 2.0 * k * beta(2.5, 1) - area * centroid * centroid;
    for (what, ours, exact) in [
        ("area", n.area, area),
        ("centroid", n.centroid.x, centroid),
        ("about x", n.second_moments.about_x, about_x),
        ("about y", n.second_moments.about_y, about_y),
        ("nose", n.nose_radius, 0.5 * k * k),
        ("thickness", n.thickness, 4.0 * k / 27.0_f64.sqrt()),
        ("thickness at", n.thickness_at, 1.0 / 3.0),
        ("sharpest", n.sharpest.radius, 0.5 * k * k),
    ] {
        assert!((ours / exact - 1.0).abs() < 1e-9, "{what}: {ours} {exact}");
    }
    assert!(n.second_moments.product.abs() < 1e-15 && n.centroid.y.abs() < 1e-15);
    assert!(n.hollowest.is_none());
    // The a = 1 line droops at both ends, and a flap makes a hollow corner.
    let flapped = section.flapped(flap(10.0, HingeHeight::Upper, FlapSurface::Broken)).expect("a flap");
    assert_eq!(flapped.numbers().hollowest.expect("a hollow").radius, 0.0);
    assert!((flapped.numbers().thickness - n.thickness).abs() < 1e-15);
}

/// Solid four-digit sections: area 0.685083 t, ∫ y² dA = 0.03940746 t³ and the centroid, which does not
/// depend on t, by integration of NACA Report 460's polynomial (closed form, computed elsewhere).
#[test]
fn second_moments_of_four_digit_sections_agree_with_their_polynomial() {
    for (name, area, about_x, about_y) in [
        ("NACA 0009", 0.061_657_50, 2.872_804e-5, 3.403_766e-3),
        ("NACA 0012", 0.082_210_00, 6.809_609e-5, 4.538_354e-3),
        ("NACA 0015", 0.102_762_50, 1.330_002e-4, 5.672_943e-3),
    ] {
        let n = published(name).numbers();
        assert!((n.area - area).abs() < 1e-8, "{name}: {}", n.area);
        assert!((n.centroid.x - 0.420_435_47).abs() < 1e-8, "{name}: {}", n.centroid.x);
        assert!(
            (n.second_moments.about_x / about_x - 1.0).abs() < 3e-7,
            "{name}: {}",
            n.second_moments.about_x
        );
        assert!(
            (n.second_moments.about_y / about_y - 1.0).abs() < 3e-7,
            "{name}: {}",
            n.second_moments.about_y
        );
    }
}

#[test]
fn families_take_fractions_in_a_section_file() {
    let own = file(
        "name = \"Custom\"\n[family]\nline = \"four-digit\"\ncamber = \"3.3 %\"\ncamber-at = 0.42\nthickness = \"11.5 %\"\n",
    );
    let same = member(0.033, 0.42, 0.115).expect("a member").named("Custom".to_owned());
    assert_eq!(own, same);
    let own = file(
        "name = \"Custom\"\n[family]\nline = \"uniform-load\"\na = 0.6\ndesign-lift = 0.25\nform = \"modified\"\nthickness = 0.095\nthickness-at = 0.45\nnose = 5\ntrailing-edge = \"closed\"\n",
    );
    let line = MeanLine::UniformLoad(UniformLoad::new(0.6, 0.25).expect("a line"));
    let form = ThicknessForm::modified(0.095, 5.0, 0.45, TrailingEdge::Closed).expect("a form");
    assert_eq!(own, Section::new("Custom".to_owned(), line, form).expect("a section"));
    // A line of a family with a thickness of one's own, and the other way round.
    let mixed = file(
        "name = \"Mixed\"\nthickness = \"0.3*sqrt(x)*(1 - x)\"\n[family]\nline = \"five-digit-reflexed\"\ncamber-at = 0.17\ndesign-lift = 0.3\n",
    );
    assert!((mixed.numbers().camber_at - 0.17).abs() < 1e-7);
    let mixed = file("name = \"Mixed\"\ncamber = \"0.1*x*(1 - x)\"\n[family]\nthickness = 0.12\n");
    assert!((mixed.numbers().camber - 0.025).abs() < 1e-12);

    for (table, says) in [
        ("line = \"four-digit\"\ncamber = 0.02\nthickness = 0.12", "camber-at is missing"),
        ("line = \"straight\"\ncamber = 0.02\nthickness = 0.12", "camber has no effect"),
        ("line = \"four digit\"\nthickness = 0.12", "did you mean \"four-digit\""),
        ("thickness = 12", "from 0.005 to 0.4"),
        ("thickness = \"0.12\"", "thickness takes a share"),
        ("thickness = 0.12\nnose = 3", "nose has no effect on the four-digit form"),
        ("form = \"modified\"\nthickness = 0.12", "thickness-at is missing"),
        ("form = \"modified\"\nthickness = 0.12\nthickness-at = 0.4\nnose = 8.5", "no such nose"),
        ("line = \"uniform-load\"\na = 0.01\ndesign-lift = 0.2\nthickness = 0.1", "no line a = 0.01"),
        ("line = \"five-digit\"\ncamber-at = 0.5\ndesign-lift = 0.2\nthickness = 0.1", "highest point at 50"),
        ("thicknes = 0.12", "did you mean thickness"),
    ] {
        let text = format!("name = \"a\"\n[family]\n{table}\n");
        let error = Section::from_file_text(&text, "a.toml").expect_err(table).to_string();
        assert!(error.contains(says), "{error}");
    }
}

#[test]
fn section_files_work_blend_and_flap() {
    let files = |name: &str, _most: usize| match name {
        "other.toml" => Ok(SURFACES.as_bytes().to_vec()),
        _ => Err(std::io::Error::from(std::io::ErrorKind::NotFound)),
    };
    let beside = Beside::new(&files);
    let read = |text: &str| {
        let own = text.to_owned();
        let files = move |name: &str, most: usize| match name {
            "own.toml" => Ok(own.as_bytes().to_vec()),
            _ => files(name, most),
        };
        Beside::new(&files).section("own.toml").map_err(|error| error.render(false))
    };
    assert!(beside.section("other.toml").is_ok());
    let text = "name = \"Worked\"
[blend]
first = \"other.toml\"
second = \"NACA 4415\"
share = 0.25
[work]
thickness = \"11 %\"
thickness-at = 0.35
camber = \"2 %\"
trailing-edge = 0.008
edge-from = 0.7
[flap]
hinge = \"72 %\"
angle = \"8 deg\"
axis = \"upper\"
bend = 0.1
";
    let section = read(text).unwrap_or_else(|error| panic!("{error}"));
    let n = section.numbers();
    for (ours, asked) in
        [(n.thickness, 0.11), (n.thickness_at, 0.35), (n.camber, 0.02), (n.trailing_edge_thickness, 0.008)]
    {
        assert!((ours - asked).abs() < 1e-7, "{ours} {asked}");
    }
    assert_eq!(section.name(), "Worked");
    for (from, to, says) in [
        ("share = 0.25\n", "", "share is missing"),
        ("first = \"other.toml\"\n", "", "first is missing"),
        ("other.toml", "another.toml", "another.toml cannot be read"),
        ("other.toml", "../other.toml", "beside the one that names it"),
        ("NACA 4415", "NACA 44", "has 2 digits"),
        ("\"8 deg\"", "8", "an angle has its unit with it"),
        ("\"8 deg\"", "\"8 mm\"", "angle"),
        ("axis = \"upper\"", "axis = \"top\"", "it takes one of: middle, upper, lower"),
        ("hinge = \"72 %\"\n", "", "hinge is missing"),
        ("thickness-at = 0.35", "thickness-at = 0.89", "stretched more than"),
        ("bend = 0.1", "bend = 0.7", "there is room for"),
        ("edge-from", "edge-form", "did you mean edge-from"),
    ] {
        let error = read(&text.replace(from, to)).expect_err(to);
        assert!(error.contains(says) && error.contains("own.toml:"), "{error}");
    }
}

/// The whole range that a builder may ask for, on a grid: what is accepted is a plain closed outline
/// that measures what was asked, and what is refused does fold.
#[test]
fn the_range_is_covered_but_where_the_outline_folds() {
    let (mut all, mut refused, mut in_use, mut refused_in_use) = (0, 0, 0, 0);
    for thickness in [0.01, 0.02, 0.05, 0.08, 0.12, 0.16, 0.21, 0.3, 0.4] {
        for camber in [0.0, 0.01, 0.02, 0.04, 0.06, 0.09, 0.12] {
            for position in [0.05, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9] {
                all += 1;
                // What has been built and sailed: not thicker than 21 %, not more cambered than 6 %.
                let used = thickness <= 0.21 && camber <= 0.06 && position >= 0.2;
                in_use += usize::from(used);
                match member(camber, position, thickness) {
                    Ok(section) => {
                        let n = section.numbers();
                        assert!(
                            (n.thickness - 1.000_287_884 * thickness).abs() < 1e-9,
                            "{thickness} {camber} {position}"
                        );
                        assert!((n.camber - camber).abs() < 1e-12);
                        assert!(camber == 0.0 || (n.camber_at - position).abs() < 1e-9);
                        let points = section.points(601);
                        assert!(points.iter().all(|p| p.is_finite()));
                        let outline = ArcPath::polyline(points, true);
                        assert!(outline.refuse_crossings(1e-6).is_ok(), "{thickness} {camber} {position}");
                        // And to the very thickness where that is asked.
                        if let Ok(exact) =
                            section.worked(&Work { thickness: Some(thickness.max(0.011)), ..Work::NONE })
                        {
                            assert!((exact.numbers().thickness - thickness.max(0.011)).abs() < 1e-10);
                        }
                    }
                    Err(SectionError::Folds { .. }) => {
                        refused += 1;
                        refused_in_use += usize::from(used);
                        assert!(turns_back(camber, position, thickness), "{thickness} {camber} {position}");
                    }
                    Err(error) => panic!("{error}"),
                }
            }
        }
    }
    println!("refused as folding: {refused} of {all}; of sections in use {refused_in_use} of {in_use}");
    assert_eq!(refused_in_use, 0);
}

/// Whether the published construction, point by point, makes a surface run forward again.
fn turns_back(camber: f64, position: f64, thickness: f64) -> bool {
    let line = MeanLine::FourDigit { camber, position };
    let form = ThicknessForm::four_digit(thickness, TrailingEdge::Published);
    [1.0, -1.0].iter().any(|side| {
        let at = |i: u32| {
            let root = f64::from(i) / 20_000.0;
            let ordinate = line.at(root * root);
            let angle = ordinate.slope.atan();
            let half = side * form.half_at_root(root)[0];
            let point = Vec2::new(root * root - half * angle.sin(), ordinate.y + half * angle.cos());
            (point, Vec2::new(angle.cos(), angle.sin()))
        };
        (1..20_000).any(|i| (at(i + 1).0 - at(i).0).dot(at(i).1) < 0.0)
    })
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(60))]

    /// Whatever is asked of whatever section is had to the last digits, or refused with a reason.
    #[test]
    fn work_is_done_as_asked(
        which in 0usize..4,
        thickness in 0.01..0.4,
        thickness_at in 0.05..0.9,
        camber in -0.12..0.12,
        camber_at in 0.05..0.9,
        edge in 0.0..0.03,
    ) {
        let section = match which {
            0 => published("NACA 4412"),
            1 => published("NACA 2410-64"),
            2 => published("NACA 16-212"),
            _ => Section::blend("b".to_owned(), &published("NACA 6409"), &file(SURFACES), 0.4).expect("a blend"),
        };
        let work = Work {
            thickness: Some(thickness),
            thickness_at: Some(thickness_at),
            camber: Some(camber),
            camber_at: Some(camber_at),
            trailing_edge: Some(edge),
            edge_from: 0.7,
        };
        match section.worked(&work) {
            Ok(made) => {
                let n = made.numbers();
                prop_assert!((n.thickness - thickness).abs() < 1e-9 && (n.camber - camber).abs() < 1e-9);
                prop_assert!((n.thickness_at - thickness_at).abs() < 1e-6, "{} {}", n.thickness_at, thickness_at);
                prop_assert!((n.camber_at - camber_at).abs() < 1e-6, "{} {}", n.camber_at, camber_at);
                prop_assert!((n.trailing_edge_thickness - edge).abs() < 1e-9);
                prop_assert!(made.points(201).iter().all(|p| p.is_finite()));
            }
            Err(error) => {
                let why = error.to_string();
                let known = ["stretched more than", "folds over", "cross", "cannot be had together"];
                prop_assert!(known.iter().any(|reason| why.contains(reason)), "{}", why);
            }
        }
    }

    /// Any flap is a plain outline or refused with a reason.
    #[test]
    fn flaps_are_sound(
        hinge in 0.2..0.98,
        angle in -60.0..60.0,
        height in prop::sample::select(vec![HingeHeight::Upper, HingeHeight::Middle, HingeHeight::Lower]),
        bend in prop::option::of(0.01..0.5),
        name in prop::sample::select(vec!["NACA 0012", "NACA 4415", "NACA 23112", "NACA 0006"]),
    ) {
        let surface = bend.map_or(FlapSurface::Broken, |over| FlapSurface::Smooth { over });
        let flap = Flap { hinge, height, angle: f64::to_radians(angle), surface };
        if let Ok(flapped) = published(name).flapped(flap) {
            let points = flapped.points(801);
            prop_assert!(points.iter().all(|p| p.is_finite()));
            prop_assert!(flapped.breaks().windows(2).all(|pair| pair[0] < pair[1]));
            prop_assert!(flapped.numbers().area > 0.0);
            let outline = ArcPath::polyline(points, true);
            prop_assert!(outline.refuse_crossings(1e-6).is_ok(), "{} {} {}", name, hinge, angle);
        }
    }
}
