//! Sections from coordinates: tables and traced drawings come back as what they were made from.

use plankform::geometry::{Curve, Point};
use plankform::section::coordinates::{Traced, from_table};
use plankform::section::{Section, TrailingEdge};

fn section(name: &str, edge: TrailingEdge) -> Section {
    Section::from_designation(name, edge).expect("a section")
}

fn table(points: &[Point], digits: usize) -> String {
    points.iter().map(|p| format!("{:.digits$} {:.digits$}\n", p.x, p.y)).collect()
}

fn read(text: &str) -> Traced {
    from_table(text, "t.txt", None).unwrap_or_else(|error| panic!("{error}"))
}

/// Greatest distance of the outline from the equation, in chords, wherever both have a surface.
/// nose
fn radius(traced: &Traced, section: &Section) -> f64 {
    traced.surfaces.at(0.0)[1].powi(2) / 2.0 * traced.report.placing.chord()
        / section.numbers().nose_radius_on_outline
        - 1.0
}
fn apart(traced: &Traced, section: &Section, to_unit: impl Fn(Point) -> Point) -> f64 {
    let mut most = 0.0_f64;
    let mut guess = -1.0;
    for i in -2000..=2000 {
        let t = f64::from(i) / 2000.0;
        let point = to_unit(traced.report.placing.to_file(Point::new(t * t, traced.surfaces.at(t)[0])));
        let mut s: f64 = guess;
        for _ in 0..20 {
            let jet = section.jet(s);
            let step = (point - jet.point).dot(jet.first) / jet.first.hypot2();
            s += step.clamp(-0.05, 0.05);
        }
        guess = s;
        let jet = section.jet(s);
        let distance = (point - jet.point).hypot();
        most = most.max(distance);
    }
    most
}

#[test]
fn measure() {
    for name in ["0012", "2412", "4412", "23012", "0006", "0024", "16-009", "4415"] {
        for edge in [TrailingEdge::Published, TrailingEdge::Closed] {
            let section = section(&format!("NACA {name}"), edge);
            for n in [41, 61, 81, 101, 201] {
                for digits in [5, 12] {
                    let start = std::time::Instant::now();
                    let traced = match from_table(&table(&section.points(n), digits), "t", None) {
                        Ok(t) => t,
                        Err(e) => {
                            println!("{name} {n} {digits} {e}");
                            continue;
                        }
                    };
                    println!(
                        "{name} {edge:?} {n} {digits}: apart {:.1e} fit {:.1e} at {} reached {} waves {} outliers {:?} radius {:.4} nose {:?} {:?}",
                        apart(&traced, &section, |p| p),
                        traced.report.greatest_distance,
                        traced.report.greatest_at,
                        traced.report.reached,
                        traced.report.waves.len(),
                        traced.report.outliers.iter().map(|o| o.index).collect::<Vec<_>>(),
                        radius(&traced, &section),
                        traced.report.placing.nose(),
                        start.elapsed()
                    );
                }
            }
        }
    }
}
