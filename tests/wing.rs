//! Planform and loft against closed forms.

use plankform::geometry::{Curve, Point};
use plankform::section::{Section, TrailingEdge};
use plankform::wing::{Law, Station, Tip, TipForm, Wing, WingError, along};

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

/// A rectangle whose ends are quarter ellipses, cut off where 40 % of the chord is left. In closed form,
/// with L the length of the tip, q the chord left and L' = L/√(1 - q²): the area under the ellipse
/// c √(1 - (y/L')²) from 0 to L is c/2 (L q + L' asin(L/L')); ∫ c² dy is c² (L - L³/(3 L'²)).
#[test]
fn a_rounded_tip_measures_as_its_ellipse() {
    let (c, l, q, reach) = (100.0, 60.0, 0.4, 400.0);
    let stations = vec![station(0.0, c, 0.0, 0.0, "NACA 0012"), station(reach, c, 0.0, 0.0, "NACA 0012")];
    let wing = Wing::new(stations, true).expect("a foil");
    for about in [0.0, 0.25, 0.5, 1.0] {
        let tip = Tip { form: TipForm::Rounded, length: l, chord: q * c, about };
        let wing = wing.clone().with_tip(tip).expect("a tip");
        let whole: f64 = l / f64::sqrt(1.0 - q * q);
        let half = (reach - l) * c + 0.5 * c * (l * q + whole * (l / whole).asin());
        let planform = wing.planform();
        assert!((planform.area() / (2.0 * half) - 1.0).abs() < 3e-5, "{} {half}", planform.area());
        let square = (reach - l) * c * c + c * c * (l - l.powi(3) / (3.0 * whole * whole));
        assert!((planform.aerodynamic_chord() / (square / half) - 1.0).abs() < 1e-4);
        assert!((planform.aspect_ratio() / (4.0 * reach * reach / (2.0 * half)) - 1.0).abs() < 3e-5);
        assert!((planform.mean_chord() / (half / reach) - 1.0).abs() < 3e-5);
        // The quarter chord moves by (about - 1/4) of what the chord loses: the centre's moment is
        // ∫ (a - 1/4)(c - c(y)) c(y) dy, which is (a - 1/4)(c ∫ c(y) dy - ∫ c(y)² dy) over the tip.
        let moment = (about - 0.25) * (c * half - square);
        assert!((planform.aerodynamic_centre() - moment / half).abs() < 1e-3, "{about}");
        // Every outline in the tip is the section at its chord, and the place named stays.
        for beyond in [0.0_f64, 20.0, 45.0, 60.0] {
            let shape = wing.shape_at(reach - l + beyond).expect("a shape");
            let chord = c * (1.0 - (beyond / whole).powi(2)).sqrt();
            assert!((shape.chord - chord).abs() < 1e-9 && (wing.chord_at(shape.at) - chord).abs() < 1e-9);
            assert!((shape.nose.x + about * chord - (about - 0.25) * c).abs() < 1e-9);
            let thickest = wing.stations()[0].section.jet(-0.5).point.to_vec2() * chord;
            assert!((shape.jet(-0.5).point.to_vec2() - thickest).hypot() < 1e-9);
        }
    }
}

/// A tapered foil cut across at its end: two trapezoids, whose edges are straight.
#[test]
fn a_cut_tip_measures_as_two_trapezoids() {
    let stations =
        vec![station(0.0, 140.0, 0.0, 0.0, "NACA 4412"), station(400.0, 80.0, 0.0, 30.0, "NACA 4412")];
    let tip = Tip { form: TipForm::Cut, length: 50.0, chord: 20.0, about: 1.0 };
    let wing = Wing::new(stations, true).expect("a foil").with_tip(tip).expect("a tip");
    let at_tip = 140.0 - 60.0 * 350.0 / 400.0;
    let half = 0.5 * (140.0 + at_tip) * 350.0 + 0.5 * (at_tip + 20.0) * 50.0;
    let planform = wing.planform();
    assert!((planform.area() - 2.0 * half).abs() < 1e-6, "{} {half}", planform.area());
    let square = |a: f64, b: f64, l: f64| l * (a * a + a * b + b * b) / 3.0;
    let chord = (square(140.0, at_tip, 350.0) + square(at_tip, 20.0, 50.0)) / half;
    assert!((planform.aerodynamic_chord() - chord).abs() < 1e-9);
    // The trailing edge runs on as if nothing were cut, and the leading edge is straight.
    let trailing = |at: f64| 30.0 * at / 400.0 + 0.75 * (140.0 - 60.0 * at / 400.0);
    for at in [350.0, 370.0, 400.0] {
        let shape = wing.shape_at(at).expect("a shape");
        assert!((shape.nose.x + shape.chord - trailing(at)).abs() < 1e-9, "{at}");
        let straight = at_tip + (20.0 - at_tip) * (at - 350.0) / 50.0;
        assert!((shape.chord - straight).abs() < 1e-9, "{at}");
    }
}

/// How the outline moves along the span is what the skin's allowance leans by: against differences, in
/// a swept, twisted, tapered foil with either tip.
#[test]
fn the_lean_in_a_tip_is_that_of_its_surface() {
    for form in [TipForm::Rounded, TipForm::Cut] {
        let stations =
            vec![station(0.0, 140.0, 1.0, 0.0, "NACA 4412"), station(400.0, 80.0, -2.0, 30.0, "NACA 2410")];
        let tip = Tip { form, length: 60.0, chord: 30.0, about: 0.4 };
        let wing = Wing::new(stations, true).expect("a foil").with_tip(tip).expect("a tip");
        for at in [200.0, 345.0, 370.0, 395.0] {
            let shape = wing.shape_at(at).expect("a shape");
            for t in [-0.9, -0.4, 0.0, 0.3, 1.0] {
                let place = |at: f64| {
                    let shape = wing.shape_at(at).expect("a shape");
                    shape.to_foil() * shape.jet(t).point
                };
                let change = (place(at + 1e-4) - place(at - 1e-4)) / 2e-4;
                let own = shape.to_foil() * shape.spread(t).to_point() - shape.to_foil() * Point::ORIGIN;
                assert!((change - own).hypot() < 1e-6, "{form:?} {at} {t}: {change:?} {own:?}");
            }
        }
        for bad in [
            Tip { length: 400.0, ..tip },
            Tip { length: f64::NAN, ..tip },
            Tip { chord: 80.0, ..tip },
            Tip { chord: 0.0, ..tip },
            Tip { about: 1.5, ..tip },
        ] {
            let plain = Wing::new(wing.stations().to_vec(), true).expect("a foil");
            let error = plain.with_tip(bad).expect_err("no tip");
            assert!(matches!(error, WingError::TipLength { .. } | WingError::TipChord { .. }));
        }
    }
}

/// The skin of a prism is its outline's length times its span, with its blunt edge; that of a wedge
/// like loft of one section is the outline's length by the mean chord, longer by how the surfaces lean.
#[test]
fn wetted_area_of_prism_and_taper() {
    let length = |section: &Section, chord: f64| {
        let points: Vec<Point> =
            (0..=40_000).map(|i| section.jet(f64::from(i) / 20_000.0 - 1.0).point).collect();
        let around: f64 = points.windows(2).map(|pair| pair[0].distance(pair[1])).sum();
        chord * (around + points[0].distance(points[points.len() - 1]))
    };
    let prism = Wing::new(
        vec![station(0.0, 110.0, 0.0, 0.0, "NACA 0015"), station(850.0, 110.0, 0.0, 0.0, "NACA 0015")],
        false,
    )
    .expect("a strut");
    let around = length(&prism.stations()[0].section, 110.0);
    let area = prism.wetted_area(300.0, 850.0).expect("an area");
    assert!((area / (around * 550.0) - 1.0).abs() < 1e-5, "{area} {}", around * 550.0);
    let tapered = Wing::new(
        vec![station(0.0, 150.0, 0.0, 0.0, "NACA 0002"), station(500.0, 50.0, 0.0, 0.0, "NACA 0002")],
        false,
    )
    .expect("a fin");
    // So thin that both sides are the flat trapezoid: 1 + (thickness slopes)² / 2 is below 1e-3 off.
    let flat = 2.0 * 0.5 * (150.0 + 50.0) * 500.0;
    let area = tapered.wetted_area(0.0, 500.0).expect("an area");
    assert!(area > flat && area < 1.003 * flat, "{area} {flat}");
    assert!(prism.wetted_area(-1.0, 20.0).is_err() && prism.wetted_area(0.0, 900.0).is_err());
}
