//! Planform and loft against closed forms.

use plankform::geometry::{Curve, Point};
use plankform::section::{Section, TrailingEdge};
use plankform::wing::{Law, Station, Wing, WingError, along};

fn station(at: f64, chord: f64, twist_deg: f64, sweep: f64, name: &str) -> Station {
    let section = Section::from_designation(name, TrailingEdge::Published).expect("a section");
    Station { at, chord, section, twist: twist_deg.to_radians(), sweep, rise: 0.0, twist_about: 0.25 }
}

#[test]
fn a_straight_tapered_planform_measures_as_a_trapezoid() {
    let stations =
        vec![station(0.0, 140.0, 0.0, 0.0, "NACA 4412"), station(450.0, 80.0, 0.0, 20.0, "NACA 4412")];
    let planform = Wing::new(stations, true).expect("a foil").planform();
    // Trapezoid: mean of the two chords times the span, both halves.
    assert!((planform.area() - 0.5 * (140.0 + 80.0) * 900.0).abs() < 1e-6);
    assert!((planform.span() - 900.0).abs() < 1e-9);
    assert!((planform.aspect_ratio() - 900.0 / 110.0).abs() < 1e-9);
    assert!((planform.mean_chord() - 110.0).abs() < 1e-9);
    assert!((planform.taper() - 80.0 / 140.0).abs() < 1e-12);
    // The quarter chord of the tip lies 20 mm aft of the root's.
    let tip = (planform.leading[1], planform.trailing[1]);
    assert!((tip.0.y + 0.25 * (tip.1.y - tip.0.y) - 20.0).abs() < 1e-9);
}

#[test]
fn the_loft_is_straight_between_stations() {
    let stations =
        vec![station(0.0, 140.0, 1.0, 0.0, "NACA 4412"), station(450.0, 80.0, -2.0, 20.0, "NACA 23012")];
    let wing = Wing::new(stations, true).expect("a foil");
    // A batten laid from root to tip touches the same point of every station between.
    let in_space = |at: f64, t: f64| {
        let shape = wing.shape_at(at).expect("on the foil");
        let p = shape.jet(t).point;
        let (sin, cos) = (-shape.twist).sin_cos();
        Point::new(shape.nose.x + p.x * cos - p.y * sin, shape.nose.y + p.x * sin + p.y * cos)
    };
    for t in [-1.0, -0.6, -0.2, 0.0, 0.3, 0.8, 1.0] {
        let (root, tip) = (in_space(0.0, t), in_space(450.0, t));
        for fraction in [0.1, 0.25, 0.5, 0.9] {
            let off = in_space(450.0 * fraction, t).distance(root.lerp(tip, fraction));
            assert!(off < 1e-9, "{off} mm off the batten at {t}, {fraction}");
        }
    }
    // At a station the shape is the station's own section.
    let shape = wing.shape_at(0.0).expect("on the foil");
    assert!((shape.chord - 140.0).abs() < 1e-9 && (shape.twist.to_degrees() - 1.0).abs() < 1e-9);
    for t in [-0.7, 0.4] {
        let expected = wing.stations()[0].section.jet(t).point.to_vec2() * 140.0;
        assert!((shape.jet(t).point.to_vec2() - expected).hypot() < 1e-9);
    }
}

#[test]
fn nose_up_twist_lifts_the_nose() {
    let twisted = |deg| {
        let stations =
            vec![station(0.0, 100.0, deg, 0.0, "NACA 0012"), station(100.0, 100.0, deg, 0.0, "NACA 0012")];
        Wing::new(stations, false).expect("a foil")
    };
    let wing = twisted(5.0);
    let shape = wing.shape_at(0.0).expect("on the foil");
    assert!((shape.nose.y - 25.0 * 5_f64.to_radians().sin()).abs() < 1e-9);
    assert!((shape.twist.to_degrees() - 5.0).abs() < 1e-9);
}

#[test]
fn stations_that_make_no_foil_are_refused() {
    let at = |at, chord| station(at, chord, 0.0, 0.0, "NACA 0012");
    let refused = |stations| Wing::new(stations, true).expect_err("no foil");
    assert!(matches!(refused(vec![at(0.0, 100.0)]), WingError::TooFewStations { count: 1 }));
    assert!(matches!(refused(vec![at(10.0, 100.0), at(20.0, 90.0)]), WingError::NoRoot { .. }));
    let crossing = vec![at(0.0, 100.0), at(300.0, 90.0), at(200.0, 80.0)];
    assert!(matches!(refused(crossing), WingError::Order { .. }));
    assert!(matches!(refused(vec![at(0.0, 100.0), at(0.0, 90.0)]), WingError::Order { .. }));
    for chord in [0.0, -5.0, f64::NAN, f64::INFINITY] {
        assert!(matches!(refused(vec![at(0.0, 100.0), at(50.0, chord)]), WingError::Station { .. }));
    }
    let wing = Wing::new(vec![at(0.0, 100.0), at(50.0, 90.0)], true).expect("a foil");
    for outside in [-1.0, 50.1, f64::NAN] {
        assert!(matches!(wing.shape_at(outside), Err(WingError::OffTheFoil { .. })));
    }
}

/// A trapezoid in closed form: mean aerodynamic chord 2/3 (a + b - a b/(a + b)), and with a straight
/// quarter-chord line swept by s over the half span the centre at s (1 + 2 l)/(3 (1 + l)), l the taper.
#[test]
fn the_aerodynamic_centre_of_a_trapezoid() {
    let (a, b, s) = (140.0, 70.0, 36.0);
    let stations = vec![station(0.0, a, 0.0, 0.0, "NACA 0012"), station(450.0, b, 0.0, s, "NACA 0012")];
    let planform = Wing::new(stations, true).expect("a foil").planform();
    assert!((planform.aerodynamic_chord() - 2.0 / 3.0 * (a + b - a * b / (a + b))).abs() < 1e-9);
    let taper = b / a;
    let centre = s * (1.0 + 2.0 * taper) / (3.0 * (1.0 + taper));
    assert!((planform.aerodynamic_centre() - centre).abs() < 1e-9, "{}", planform.aerodynamic_centre());
}

/// A half ellipse over the span, cut at nothing: area π/4 of span times root chord, mean aerodynamic
/// chord 8/(3 π) of the root chord.
#[test]
fn an_elliptic_planform_measures_as_an_ellipse() {
    let given = vec![station(0.0, 120.0, 0.0, 0.0, "NACA 0012"), station(400.0, 0.5, 0.0, 0.0, "NACA 0012")];
    let planform =
        Wing::new(along(Law::Elliptic, given).expect("stations"), true).expect("a foil").planform();
    // The half millimetre at the tip is a strip of its own beside an ellipse of so much less chord.
    let area = std::f64::consts::FRAC_PI_4 * 800.0 * 119.5 + 800.0 * 0.5;
    assert!((planform.area() / area - 1.0).abs() < 2e-4, "{} {area}", planform.area());
    let chord = 8.0 / (3.0 * std::f64::consts::PI) * 120.0;
    assert!((planform.aerodynamic_chord() / chord - 1.0).abs() < 2e-3, "{}", planform.aerodynamic_chord());
}

#[test]
fn a_smooth_law_goes_through_its_stations_and_never_overshoots() {
    let given = vec![
        station(0.0, 140.0, 0.0, 0.0, "NACA 4412"),
        station(150.0, 138.0, -0.2, 1.0, "NACA 4412"),
        station(300.0, 110.0, -1.0, 8.0, "NACA 2412"),
        station(450.0, 60.0, -2.0, 30.0, "NACA 2412"),
    ];
    let all = along(Law::Smooth, given.clone()).expect("stations");
    assert!(all.len() > 90);
    for station in &given {
        let same = all.iter().find(|s| (s.at - station.at).abs() < 1e-9).expect("the station");
        assert_eq!((same.chord, same.twist, same.sweep), (station.chord, station.twist, station.sweep));
    }
    for pair in all.windows(2) {
        assert!(pair[0].at < pair[1].at && pair[0].chord >= pair[1].chord && pair[0].sweep <= pair[1].sweep);
    }
    assert!(matches!(along(Law::Elliptic, given), Err(WingError::EllipticStations { count: 4 })));
}

/// On a straight foil a batten lies on the design; on a curved one it does not, and the fewest places
/// keep it within what is asked.
#[test]
fn battens_and_the_fewest_templates() {
    let straight = Wing::new(
        vec![station(0.0, 140.0, 0.0, 0.0, "NACA 4412"), station(450.0, 80.0, -2.0, 20.0, "NACA 2412")],
        true,
    );
    let straight = straight.expect("a foil");
    assert!(straight.batten_gap(0.0, 450.0).expect("a gap") < 1e-9);
    assert_eq!(straight.fewest_templates(0.1).expect("places"), [0.0, 450.0]);

    let given = vec![station(0.0, 140.0, 0.0, 0.0, "NACA 0012"), station(450.0, 50.0, 0.0, 0.0, "NACA 0012")];
    let curved = Wing::new(along(Law::Elliptic, given).expect("stations"), true).expect("a foil");
    // Halfway the chord is 50 + 90 √(3/4) where the batten's is 95: the trailing edge is off by 3/4 of that
    // difference along the chord, and the thickest place by 6 % of it and a little across.
    let gap = curved.batten_gap(0.0, 450.0).expect("a gap");
    assert!(gap > 2.0, "{gap}");
    let mut before = usize::MAX;
    for fairing in [0.1, 0.3, 1.0] {
        let places = curved.fewest_templates(fairing).expect("places");
        assert_eq!((places[0], places[places.len() - 1]), (0.0, 450.0));
        for pair in places.windows(2) {
            assert!(
                curved.batten_gap(pair[0], pair[1]).expect("a gap") <= fairing || pair[1] - pair[0] < 1.2
            );
        }
        println!("{fairing} mm: {} places", places.len());
        assert!(places.len() < before);
        before = places.len();
    }
}
