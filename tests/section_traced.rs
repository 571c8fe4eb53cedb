//! Sections from traced outlines: drawings come back as what they were made from.

#[path = "common/coordinates.rs"]
mod coordinates;

use coordinates::{apart, read, section, table};
use dxf::LwPolylineVertex;
use dxf::entities::{Arc, Entity, EntityType, Line, LwPolyline, Polyline, Spline, Vertex};
use dxf::enums::{AcadVersion, Units};
use plankform::export;
use plankform::geometry::{Affine, Curve, Jet, Point, Vec2, follow_with_arcs};
use plankform::section::coordinates::{ChordUnit, CoordinateError, LARGEST_DRAWING, Traced, from_dxf};
use plankform::section::{Section, TrailingEdge};
use plankform::workshop::{Drawing, Role};

/// A section at a chord in millimetres, to draw it.
struct Sized<'a>(&'a Section, f64);

impl Curve for Sized<'_> {
    fn jet(&self, t: f64) -> Jet {
        let Jet { point, first, second } = self.0.jet(t);
        let size = self.1;
        Jet { point: (size * point.to_vec2()).to_point(), first: size * first, second: size * second }
    }

    fn breaks(&self) -> Vec<f64> {
        self.0.breaks()
    }
}

fn traced(bytes: &[u8]) -> Traced {
    from_dxf(bytes, "outline.dxf", None).unwrap_or_else(|error| panic!("{error}"))
}

/// A drawing of some objects, written by a library that is not ours.
fn drawn(units: Units, entities: Vec<EntityType>) -> Vec<u8> {
    let mut drawing = dxf::Drawing::new();
    drawing.header.version = AcadVersion::R2000;
    drawing.header.default_drawing_units = units;
    for specific in entities {
        let mut entity = Entity::new(specific);
        entity.common.layer = "foil".to_owned();
        drawing.add_entity(entity);
    }
    let mut bytes = Vec::new();
    drawing.save(&mut bytes).expect("a drawing");
    bytes
}

fn polyline(points: &[Point], closed: bool) -> EntityType {
    let mut line = LwPolyline::default();
    line.set_is_closed(closed);
    line.vertices =
        points.iter().map(|p| LwPolylineVertex { x: p.x, y: p.y, ..Default::default() }).collect();
    EntityType::LwPolyline(line)
}

fn at(point: Point) -> dxf::Point {
    dxf::Point::new(point.x, point.y, 0.0)
}

#[test]
fn outlines_of_arcs_that_we_write_come_back() {
    for (name, edge) in [("0012", TrailingEdge::Published), ("4412", TrailingEdge::Closed)] {
        let section = section(name, edge);
        let path = follow_with_arcs(&Sized(&section, 150.0), 2e-4).expect("arcs");
        let mut drawing = Drawing::new("outline");
        drawing.add(Role::CutOutside, path);
        let found = traced(export::dxf(&drawing, export::Flavour::R2000, export::Curves::Arcs).as_bytes());
        let report = &found.report;
        assert_eq!(report.unit, ChordUnit::Named("millimetres", 1.0));
        assert!((report.chord_mm().expect("named") - 150.0).abs() < 0.1);
        // The arcs stay within 2e-4 mm, the fit within 1e-5 of the chord.
        let distance = apart(&found, &section, Affine::scale(1.0 / 150.0));
        assert!(distance < 2e-4 / 150.0 + 1.2e-5, "{name}: {distance:.1e} {report:?}");
        assert!(report.waves.is_empty() && report.reached, "{report:?}");
        assert_eq!(report.edge_gap < 1e-9, edge == TrailingEdge::Closed);
    }
}

#[test]
fn every_kind_of_curve_is_followed_in_its_unit() {
    let section = section("2412", TrailingEdge::Closed);
    let points: Vec<Point> = section.points(161).iter().map(|p| Affine::scale(6.0) * *p).collect();
    let mut old = Polyline::default();
    old.set_is_closed(true);
    let mut scratch = dxf::Drawing::new();
    for p in &points[..160] {
        old.add_vertex(&mut scratch, Vertex::new(at(*p)));
    }
    let lines = points.windows(2).rev().map(|pair| EntityType::Line(Line::new(at(pair[1]), at(pair[0]))));
    let knots = |count: usize| -> Vec<f64> { (0..count).map(|i| i as f64).collect() };
    // A spline of the first degree goes through its poles, as the polyline does.
    let spline = Spline {
        degree_of_curve: 1,
        knot_values: [vec![0.0], knots(161), vec![160.0]].concat(),
        control_points: points.iter().map(|p| at(*p)).collect(),
        weight_values: vec![1.0; 161],
        ..Default::default()
    };
    for (unit, mm, objects) in [
        (Units::Inches, 25.4, vec![polyline(&points, false)]),
        (Units::Inches, 25.4, vec![polyline(&points[..160], true)]),
        (Units::Centimeters, 10.0, lines.collect()),
        (Units::Millimeters, 1.0, vec![EntityType::Polyline(old)]),
        (Units::Feet, 304.8, vec![polyline(&points[..81], false), polyline(&points[80..], false)]),
    ] {
        let count = objects.len();
        let found = traced(&drawn(unit, objects));
        let report = &found.report;
        assert!((report.chord_mm().expect("named") / (6.0 * mm) - 1.0).abs() < 1e-3, "{count}: {report:?}");
        assert_eq!(report.title.as_deref(), Some("foil"));
        let distance = apart(&found, &section, Affine::scale(1.0 / 6.0));
        assert!(distance < 1.5e-5, "{unit:?} {count}: {distance:.1e}");
        assert!(report.waves.is_empty(), "{report:?}");
    }
    // Followed between its poles, the spline shows that it is made of straight pieces.
    let found = traced(&drawn(Units::Unitless, vec![EntityType::Spline(spline)]));
    assert_eq!(found.report.unit, ChordUnit::Unitless);
    assert!(apart(&found, &section, Affine::scale(1.0 / 6.0)) < 2e-4);
}

/// Half a turn of an ellipse as a rational spline, and from its ends two parabolas to a point: the
/// nose radius of the ellipse is b²/a.
#[test]
fn a_rational_spline_is_a_true_ellipse() {
    let (a, b) = (40.0, 8.0);
    let weight = std::f64::consts::FRAC_1_SQRT_2;
    let poles = [(0.0, b), (-a, b), (-a, 0.0), (-a, -b), (0.0, -b)];
    let ellipse = Spline {
        degree_of_curve: 2,
        knot_values: vec![0.0, 0.0, 0.0, 1.0, 1.0, 2.0, 2.0, 2.0],
        control_points: poles.iter().map(|(x, y)| dxf::Point::new(*x, *y, 0.0)).collect(),
        weight_values: vec![1.0, weight, 1.0, weight, 1.0],
        ..Default::default()
    };
    let side = |sign: f64| Spline {
        degree_of_curve: 2,
        knot_values: vec![0.0, 0.0, 0.0, 1.0, 1.0, 1.0],
        control_points: vec![
            dxf::Point::new(0.0, sign * b, 0.0),
            dxf::Point::new(50.0, sign * b, 0.0),
            dxf::Point::new(100.0, 0.0, 0.0),
        ],
        ..Default::default()
    };
    let objects =
        vec![EntityType::Spline(side(-1.0)), EntityType::Spline(ellipse), EntityType::Spline(side(1.0))];
    let found = traced(&drawn(Units::Millimeters, objects));
    assert!((found.report.placing.chord() - 140.0).abs() < 1e-3, "{:?}", found.report.placing);
    let radius = 0.5 * found.surfaces.at(0.0)[1].powi(2) * 140.0;
    assert!((radius / (b * b / a) - 1.0).abs() < 0.02, "{radius}");
    for i in -100..=-1 {
        let t = f64::from(i) / 100.0;
        let point = found.report.placing.to_file(Point::new(t * t, found.surfaces.at(t)[0]));
        // At the nose itself the radius is held above, and heights say little.
        if point.x < -39.0 {
            continue;
        }
        // Behind the ellipse x = 100 u, and y = b (1 - u²).
        let share: f64 = if point.x < 0.0 { (point.x / a).powi(2) } else { (point.x / 100.0).powi(2) };
        let drawn = if point.x < 0.0 { b * (1.0 - share).sqrt() } else { b * (1.0 - share) };
        assert!((point.y - drawn).abs() < 3e-5 * 140.0, "{point:?} {drawn}");
    }
}

#[test]
fn a_rounded_trailing_edge_is_left_out_and_said() {
    // The open edge closed by a half circle.
    let section = section("0012", TrailingEdge::Published);
    let points: Vec<Point> = section.points(141).iter().map(|p| Affine::scale(150.0) * *p).collect();
    let (up, down) = (points[0], points[140]);
    let radius = 0.5 * up.distance(down);
    let half_turn = Arc::new(dxf::Point::new(up.x, 0.0, 0.0), radius, 270.0, 90.0);
    let objects = vec![polyline(&points, false), EntityType::Arc(half_turn)];
    let found = traced(&drawn(Units::Millimeters, objects));
    let report = &found.report;
    assert!(!report.rounded.is_empty() && report.lines().iter().any(|line| line.contains("round")));
    assert!((report.edge_gap - 0.00252).abs() < 1e-4, "{}", report.edge_gap);
    assert!((report.placing.chord() - 150.0).abs() < 0.1, "{}", report.placing.chord());
    assert!(apart(&found, &section, Affine::scale(1.0 / 150.0)) < 2e-5);
    // A blunt edge with a point in its middle, in a table.
    let middle = Point::new(1.0, 0.0);
    let blunt = [vec![middle], section.points(81), vec![middle]].concat();
    let found = read(&table(&blunt, 8));
    assert_eq!(found.report.rounded, [1, 83]);
    assert!((found.report.edge_gap - 0.00252).abs() < 1e-5);
}

#[test]
fn drawings_that_hold_no_outline_are_refused() {
    let section = section("0012", TrailingEdge::Closed);
    let points: Vec<Point> = section.points(81).iter().map(|p| Affine::scale(100.0) * *p).collect();
    let aside: Vec<Point> = points.iter().map(|p| *p + Vec2::new(0.0, 50.0)).collect();
    let error = |bytes: &[u8]| from_dxf(bytes, "x.dxf", None).expect_err("no outline");
    let two = error(&drawn(Units::Millimeters, vec![polyline(&points, true), polyline(&aside, true)]));
    assert!(matches!(two, CoordinateError::SeveralOutlines { count: 2, .. }));
    assert!(two.to_string().contains("layer 'foil' handle"), "{two}");
    let mut tilted = LwPolyline { extrusion_direction: dxf::Vector::x_axis(), ..Default::default() };
    tilted.vertices =
        points.iter().map(|p| LwPolylineVertex { x: p.x, y: p.y, ..Default::default() }).collect();
    let spline = |degree: i32, knots: usize, poles: usize, weight: f64| {
        EntityType::Spline(Spline {
            degree_of_curve: degree,
            knot_values: (0..knots).map(|i| i as f64).collect(),
            control_points: points[..poles].iter().map(|p| at(*p)).collect(),
            weight_values: vec![weight; poles],
            ..Default::default()
        })
    };
    for (objects, says) in [
        (vec![], "holds no polyline"),
        (vec![EntityType::LwPolyline(tilted)], "plane of the drawing"),
        (vec![spline(3, 20, 30, 1.0)], "20 knots"),
        (vec![spline(3, 7, 3, 1.0)], "3 control points"),
        (vec![spline(0, 31, 30, 1.0)], "degree is 0"),
        (vec![spline(3, 34, 30, -1.0)], "weights"),
        (
            vec![EntityType::Arc(Arc::new(dxf::Point::origin(), 0.0, 0.0, 90.0)), polyline(&points, true)],
            "radius",
        ),
        (vec![polyline(&points[..40], false)], "trailing edge"),
        (vec![polyline(&points[..5], true)], "too few points"),
    ] {
        let error = error(&drawn(Units::Millimeters, objects)).to_string();
        assert!(error.contains(says), "{says}: {error}");
    }
    for (bytes, says) in [
        (b"".to_vec(), "no ENTITIES"),
        (b"a table\nof points\n".to_vec(), "line 1"),
        (b"0\nSECTION\n2\n".to_vec(), "breaks off"),
        (b"0\0\0binary".to_vec(), "text form"),
        (b"0\nSECTION\n2\nENTITIES\n0\nLINE\n10\nnan\n".to_vec(), "line 8"),
        (b"0\nSECTION\n2\nENTITIES\n0\nLINE\n20\n1\n".to_vec(), "without its x"),
        (vec![b' '; LARGEST_DRAWING + 1], "bytes"),
    ] {
        let error = error(&bytes).to_string();
        assert!(error.contains(says), "{says}: {error}");
    }
    // Drawn from below, as some programs mirror things.
    let mirrored: Vec<Point> = points.iter().map(|p| Point::new(-p.x, p.y)).collect();
    let mut below =
        LwPolyline { extrusion_direction: dxf::Vector::new(0.0, 0.0, -1.0), ..Default::default() };
    below.vertices =
        mirrored.iter().map(|p| LwPolylineVertex { x: p.x, y: p.y, ..Default::default() }).collect();
    let found = traced(&drawn(Units::Millimeters, vec![EntityType::LwPolyline(below)]));
    assert!(!found.report.placing.mirrored());
}

#[test]
fn mangled_drawings_are_read_or_refused() {
    let section = section("0012", TrailingEdge::Published);
    let points: Vec<Point> = section.points(41).iter().map(|p| Affine::scale(100.0) * *p).collect();
    let mut old = Polyline::default();
    let mut scratch = dxf::Drawing::new();
    for p in &points {
        old.add_vertex(&mut scratch, Vertex::new(at(*p)));
    }
    let whole = drawn(
        Units::Millimeters,
        vec![polyline(&points, true), EntityType::Polyline(old), EntityType::Spline(Spline::default())],
    );
    let text = String::from_utf8(whole).expect("text");
    let lines: Vec<&str> = text.lines().collect();
    let start = lines.iter().position(|line| *line == "ENTITIES").expect("a section");
    let mut outcomes = [0; 2];
    // A fixed sequence: the same mangling each time.
    let mut seed = 1_u64;
    let mut random = |below: usize| {
        seed = seed.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
        (seed >> 33) as usize % below
    };
    for round in 0..400 {
        let mut mangled: Vec<&str> = lines.clone();
        for _ in 0..=round % 4 {
            let place =
                if round % 3 == 0 { random(lines.len()) } else { start + random(lines.len() - start) };
            let place = place.min(mangled.len() - 1);
            match random(6) {
                0 => mangled.truncate(place.max(1)),
                1 => mangled[place] = "-1e308",
                2 => mangled[place] = "0",
                3 => mangled[place] = ["VERTEX", "SEQEND", "SPLINE", "EOF", "^", "\\U+12"][random(6)],
                4 => {
                    mangled.remove(place);
                }
                _ => mangled[place] = ["70", "10", "20", "40", "42", "230"][random(6)],
            }
        }
        let result = from_dxf(mangled.join("\n").as_bytes(), "x", None);
        outcomes[usize::from(result.is_ok())] += 1;
    }
    assert!(outcomes[0] > 100, "{outcomes:?}");
}
