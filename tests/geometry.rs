//! Outlines, contours and solids against the exact curves they stand for.

use kurbo::{ParamCurve, ParamCurveArclen, Shape};
use plankform::geometry::{
    ArcPath, ArcVertex, Curve, GeometryError, Jet, Point, Solid, Vec2, follow_with_arcs, polygon,
};
use plankform::section::{Section, TrailingEdge};
use plankform::wing::{Station, Wing};

const SECTIONS: [&str; 6] = ["NACA 0006", "NACA 0012", "NACA 4412", "NACA 6409", "NACA 23012", "NACA 0030"];

fn section(name: &str, edge: TrailingEdge) -> Section {
    Section::from_designation(name, edge).expect("a section")
}

fn foil(name: &str, edge: TrailingEdge, chord: f64) -> Wing {
    let station = |at| Station {
        at,
        chord,
        section: section(name, edge),
        twist: 0.0,
        sweep: 0.0,
        rise: 0.0,
        twist_about: 0.25,
    };
    Wing::new(vec![station(0.0), station(100.0)], false).expect("a foil")
}

/// Dense places along a curve of parameter -1 to 1.
fn dense(curve: &impl Curve) -> Vec<Point> {
    (0..=8000).map(|i| curve.jet(-1.0 + f64::from(i) / 4000.0).point).collect()
}

#[test]
fn fitted_outlines_stay_within_a_hundred_thousandth_of_chord() {
    for name in SECTIONS {
        for edge in [TrailingEdge::Published, TrailingEdge::Closed] {
            let section = section(name, edge);
            let outline = section.outline(2e-6);
            let numbers = section.numbers();
            let error = (outline.area() - numbers.area).abs();
            println!("{name}: {} cubics, area off by {error:.1e}", outline.elements().len());
            assert!(error < 1e-6, "{name}: area off by {error}");

            // Curve to path, and path to curve on a dense polyline of the curve.
            use kurbo::ParamCurveNearest;
            let segments: Vec<_> = outline.segments().collect();
            for point in dense(&section).iter().step_by(16) {
                let near = segments.iter().map(|s| s.nearest(*point, 1e-9).distance_sq);
                let off = near.fold(f64::INFINITY, f64::min).sqrt();
                assert!(off < 1e-5, "{name}: the curve is {off} from its outline at {point:?}");
            }
            let exact = ArcPath::polyline(dense(&section), true);
            for segment in &segments {
                for i in 0..12 {
                    let off = exact.distance(segment.eval(f64::from(i) / 11.0));
                    assert!(off < 1e-5, "{name}: the outline is {off} from its curve");
                }
            }
            assert!(outline.perimeter(1e-6) > 2.0 && segments.iter().all(|s| s.arclen(1e-6).is_finite()));
        }
    }
}

#[test]
fn contours_of_arcs_follow_the_curve_both_ways() {
    for name in SECTIONS {
        for edge in [TrailingEdge::Published, TrailingEdge::Closed] {
            let wing = foil(name, edge, 120.0);
            let shape = wing.shape_at(50.0).expect("on the foil");
            let contour = follow_with_arcs(&shape, 0.01).expect("a contour");
            assert!(contour.is_closed());
            contour.refuse_crossings(0.002).expect("a plain contour");
            let curve = dense(&shape);
            let forth = curve.iter().map(|p| contour.distance(*p)).fold(0.0, f64::max);
            let exact = ArcPath::polyline(curve, true);
            let back = contour.flattened(0.001).iter().map(|p| exact.distance(*p)).fold(0.0, f64::max);
            let count = contour.vertices().len();
            println!("{name} {edge:?}: {count} segments, off by {forth:.4} and {back:.4} mm");
            assert!(forth <= 0.0101 && back <= 0.0115, "{name}: {forth} {back}");
            assert!(count < 60, "{name}: {count} segments");
            let area = shape.nearest_station().section.numbers().area * 120.0 * 120.0;
            assert!(contour.area() > 0.0, "{name}: outside contours run anticlockwise");
            assert!((contour.area() - area).abs() < 0.01 * 245.0, "{name}: {} {area}", contour.area());
            let shortest = contour.segments().map(|s| s.length()).fold(f64::INFINITY, f64::min);
            assert!(shortest >= 0.05, "{name}: a segment of {shortest} mm");
        }
    }
}

/// Angle between the tangents on the two sides of a break of the curve itself.
fn exact_kink(curve: &impl Curve, t: f64) -> f64 {
    let (before, after) = (curve.jet_within(t, t - 1.0, t).first, curve.jet_within(t, t, t + 1.0).first);
    before.cross(after).atan2(before.dot(after)).abs()
}

#[test]
fn arcs_meet_with_a_common_tangent_but_where_the_curve_has_a_corner() {
    for name in SECTIONS {
        let wing = foil(name, TrailingEdge::Published, 140.0);
        let shape = wing.shape_at(0.0).expect("on the foil");
        let contour = follow_with_arcs(&shape, 0.01).expect("a contour");
        let segments: Vec<_> = contour.segments().collect();
        let joints: Vec<(Point, f64)> = shape.breaks()[1..shape.breaks().len() - 1]
            .iter()
            .map(|&t| (shape.jet(t).point, exact_kink(&shape, t)))
            .collect();
        let mut corners = 0;
        for (i, segment) in segments.iter().enumerate() {
            let next = segments[(i + 1) % segments.len()];
            // A segment's end tangent leaves its chord by half its included angle, 2 atan(bulge).
            let end = (segment.to - segment.from).angle() + 2.0 * segment.bulge.atan();
            let start = (next.to - next.from).angle() - 2.0 * next.bulge.atan();
            let kink = (start - end).sin().abs();
            match joints.iter().find(|(place, _)| place.distance(segment.to) < 1e-6) {
                // The published four-digit surface itself turns by up to 0.04° where the mean
                // line's curvature jumps: thickness is laid off across it.
                Some((_, exact)) => assert!((kink - exact).abs() < 1e-6 && *exact < 2e-3, "{name}: {kink}"),
                None if segment.to.x > 139.0 && kink > 1e-6 => corners += 1,
                None => assert!(kink < 1e-6, "{name}: a kink of {kink} at {:?}", segment.to),
            }
        }
        assert_eq!(corners, 2, "{name}: the two corners of the open trailing edge");
    }
}

#[test]
fn offsets_keep_their_distance_all_round() {
    for name in SECTIONS {
        let wing = foil(name, TrailingEdge::Published, 120.0);
        let contour = follow_with_arcs(&wing.shape_at(0.0).expect("on the foil"), 0.005).expect("a contour");
        for distance in [0.05, 0.3, 2.0] {
            let moved = contour.offset(distance).expect("one contour");
            assert!(moved.area() > contour.area());
            for point in moved.flattened(0.001) {
                let found = contour.distance(point);
                assert!((found - distance).abs() < 1e-4, "{name}: {found} for {distance} at {point:?}");
            }
        }
        let inner = contour.offset(-0.8).expect("one contour");
        for point in inner.flattened(0.001) {
            assert!((contour.distance(point) - 0.8).abs() < 1e-4, "{name}: inner offset");
        }
        assert!(matches!(contour.offset(-60.0), Err(GeometryError::Offset { pieces: 0, .. })));
    }
}

#[test]
fn arcs_measure_what_circles_measure() {
    // A circle of radius 10 as two half circles; pi from the standard library.
    let point = |x| Point::new(x, 3.0);
    let circle = ArcPath::new(
        vec![ArcVertex { point: point(15.0), bulge: 1.0 }, ArcVertex { point: point(-5.0), bulge: 1.0 }],
        true,
    );
    assert!((circle.area() - std::f64::consts::PI * 100.0).abs() < 1e-9);
    let bounds = circle.bounds();
    assert!((bounds.width() - 20.0).abs() < 1e-9 && (bounds.height() - 20.0).abs() < 1e-9);
    let length: f64 = circle.segments().map(|s| s.length()).sum();
    assert!((length - std::f64::consts::TAU * 10.0).abs() < 1e-9);
    assert!((circle.distance(Point::new(5.0, 3.0)) - 10.0).abs() < 1e-9);
    assert!((circle.to_bezier(1e-6).area() - circle.area()).abs() < 1e-3);
}

#[test]
fn bulges_are_a_quarter_of_the_included_angle() {
    // Definition in the published DXF reference: the tangent of a quarter of the included angle.
    for (degrees, radius_over_chord) in
        [(15.0_f64, 3.830_648_788), (45.0, 1.306_562_965), (60.0, 1.0), (180.0, 0.5)]
    {
        let bulge = (degrees.to_radians() / 4.0).tan();
        for sign in [1.0, -1.0] {
            let (from, to) = (Point::new(1.0, 2.0), Point::new(4.0, 6.0));
            let vertex = |point, bulge| ArcVertex { point, bulge };
            let arc = ArcPath::new(vec![vertex(from, sign * bulge), vertex(to, 0.0)], false);
            let radius = arc.segments().next().and_then(|s| s.radius()).expect("an arc");
            assert!((radius - 5.0 * radius_over_chord).abs() < 1e-7, "{degrees}: {radius}");
            // A left turn bends the arc out to the right of its chord, by half the bulge.
            let right = Vec2::new(4.0, -3.0) / 5.0;
            let top = from.midpoint(to) + right * (0.5 * bulge * sign * 5.0);
            assert!(arc.distance(top) < 1e-9, "{degrees}: {}", arc.distance(top));
            assert!(arc.flattened(1e-3).iter().all(|p| arc.distance(*p) < 1e-9));
        }
    }
}

#[test]
fn blocks_are_closed_and_hold_their_volume() {
    let ell = [(0.0, 0.0), (30.0, 0.0), (30.0, 10.0), (10.0, 10.0), (10.0, 20.0), (0.0, 20.0)]
        .map(|(x, y)| Point::new(x, y));
    let block = Solid::extruded(&ell, 6.0).expect("a block");
    assert!((block.volume() - 400.0 * 6.0).abs() < 1e-6);
    assert_eq!(block.size(), [30.0, 20.0, 6.0]);
    // Clockwise faces make the same block.
    let reversed: Vec<Point> = ell.iter().rev().copied().collect();
    assert!((Solid::extruded(&reversed, 6.0).expect("a block").volume() - 2400.0).abs() < 1e-6);
    let bow_tie = [(0.0, 0.0), (10.0, 10.0), (10.0, 0.0), (0.0, 10.0)].map(|(x, y)| Point::new(x, y));
    assert!(matches!(Solid::extruded(&bow_tie, 1.0), Err(GeometryError::Crosses { .. })));
}

#[test]
fn impossible_tolerances_and_rough_curves_are_refused() {
    let wing = foil("NACA 0012", TrailingEdge::Published, 120.0);
    let shape = wing.shape_at(0.0).expect("on the foil");
    for tolerance in [0.0, -1.0, f64::NAN, f64::INFINITY] {
        assert!(matches!(follow_with_arcs(&shape, tolerance), Err(GeometryError::Tolerance { .. })));
    }
    struct Broken;
    impl Curve for Broken {
        fn jet(&self, t: f64) -> Jet {
            let value = if t > 0.3 { f64::NAN } else { t };
            Jet { point: Point::new(value, 0.0), first: Vec2::new(1.0, 0.0), second: Vec2::ZERO }
        }

        fn breaks(&self) -> Vec<f64> {
            vec![0.0, 1.0]
        }
    }
    assert!(matches!(follow_with_arcs(&Broken, 0.01), Err(GeometryError::CannotFollow { .. })));
}

/// Nearest places, distances and shared areas of squares and triangles, by hand.
#[test]
fn polygons_keep_their_distance_and_share_their_area() {
    let p = Point::new;
    assert_eq!(polygon::nearest_between(p(0.0, 0.0), p(4.0, 0.0), p(1.0, 3.0)), p(1.0, 0.0));
    assert_eq!(polygon::nearest_between(p(0.0, 0.0), p(4.0, 0.0), p(7.0, 3.0)), p(4.0, 0.0));
    assert_eq!(polygon::nearest_between(p(1.0, 1.0), p(1.0, 1.0), p(4.0, 5.0)), p(1.0, 1.0));
    let square =
        |x: f64, y: f64, side: f64| vec![p(x, y), p(x + side, y), p(x + side, y + side), p(x, y + side)];
    let one = square(0.0, 0.0, 2.0);
    for (other, distance, area) in [
        (square(5.0, 0.0, 1.0), 3.0, 0.0),
        (square(5.0, 6.0, 1.0), 5.0, 0.0),
        (square(1.0, 1.0, 4.0), 0.0, 1.0),
        (square(0.5, 0.5, 1.0), 0.5, 1.0),
        (square(-1.0, -1.0, 4.0), 1.0, 4.0),
    ] {
        assert!((polygon::least_distance(&one, &other) - distance).abs() < 1e-12, "{other:?}");
        assert!((polygon::shared_area(&one, &other) - area).abs() < 1e-12, "{other:?}");
        let backwards: Vec<Point> = one.iter().rev().copied().collect();
        assert!((polygon::shared_area(&backwards, &other) + area).abs() < 1e-12, "{other:?}");
    }
    // A hollow shape whose two arms a strip crosses: the strip's share of each.
    let arms = [
        p(0.0, 0.0),
        p(6.0, 0.0),
        p(6.0, 5.0),
        p(4.0, 5.0),
        p(4.0, 1.0),
        p(2.0, 1.0),
        p(2.0, 5.0),
        p(0.0, 5.0),
    ];
    assert!(
        (polygon::shared_area(&arms, &[p(-1.0, 2.0), p(7.0, 2.0), p(7.0, 3.0), p(-1.0, 3.0)]) - 4.0).abs()
            < 1e-12
    );
}
