//! Flow with friction against measurement.

use super::page::{Part, Picture, Unit, row};
use super::{greatest, number, parsed, rows};
use plankform::export::chart::{Chart, Mark, Series};
use plankform::flow::{Conditions, LiftCurve, Panelling, Viscous, ViscousSolution};
use plankform::section::{Beside, Finish, Section, TrailingEdge};

/// Enough for the figures, and a third of the time of the usual number.
pub(crate) const PANELS: usize = 140;

pub(crate) fn flow(section: &Section) -> Viscous {
    Viscous::new(&Panelling::of(section, PANELS).expect("panels")).expect("a flow")
}

pub(crate) fn naca(name: &str) -> Section {
    Section::from_designation(&format!("NACA {name}"), TrailingEdge::Closed).expect("a section")
}

fn sweep(flow: &Viscous, conditions: &Conditions, [from, to, step]: [f64; 3]) -> LiftCurve {
    let count = ((to - from) / step).round() as usize;
    let angles: Vec<f64> = (0..=count).map(|i| (from + step * i as f64).to_radians()).collect();
    LiftCurve::sweep(flow, conditions, &angles).expect("a curve")
}

fn line(name: &str, curve: &LiftCurve, point: impl Fn(&ViscousSolution) -> (f64, f64)) -> Series {
    let gap = (f64::NAN, f64::NAN);
    let points = curve.points.iter().map(|p| p.solution.as_ref().map_or(gap, &point)).collect();
    Series { name: name.to_owned(), points }
}

fn by_angle(s: &ViscousSolution) -> (f64, f64) {
    (s.incidence.to_degrees(), s.cl)
}

fn lift_chart(title: &str, series: Vec<Series>, measured: Vec<Series>) -> Chart {
    Chart {
        title: title.to_owned(),
        across: "incidence, degrees".to_owned(),
        up: "lift coefficient".to_owned(),
        series,
        measured,
        ..Chart::default()
    }
}

fn drag_chart(title: &str, series: Vec<Series>, measured: Vec<Series>) -> Chart {
    Chart { across: "drag coefficient".to_owned(), ..lift_chart(title, series, measured) }
}

/// C. L. Ladson, NASA TM 4074, 1988: strips at 5 % of chord.
pub(crate) fn tripped_0012() -> Part {
    let table = parsed(include_str!("../reference/measured_naca0012.toml"));
    let rows = rows(&table["ladson_80_grit"]);
    // Prandtl and Glauert's rule for the Mach number of the test.
    let raised = 1.0 / (1.0 - 0.15_f64 * 0.15).sqrt();
    let (flow, conditions) = (flow(&naca("0012")), Conditions::free(6e6, 9.0).tripped(0.05));
    let angles: Vec<f64> = rows.iter().map(|row| row[0].to_radians()).collect();
    let at = LiftCurve::sweep(&flow, &conditions, &angles).expect("a curve");
    let within = || {
        let pairs = rows.iter().zip(&at.points).filter(|(row, _)| (-4.1..=12.2).contains(&row[0]));
        pairs.map(|(row, point)| (row, point.solution.as_ref().expect("a converged point")))
    };
    let lift = |from: f64| {
        let lifts = within().filter(|(row, _)| row[0].abs() > 1.0 && row[0] >= from);
        greatest(lifts.map(|(row, s)| raised * s.cl / row[1] - 1.0))
    };
    let drag = greatest(within().map(|(row, s)| s.cd / row[2] - 1.0));
    let curve = sweep(&flow, &conditions, [-5.0, 20.0, 1.0]);
    let (greatest_lift, greatest_at) = curve.greatest_lift().expect("a greatest lift");
    let measured_max = rows.iter().map(|row| row[1]).fold(0.0, f64::max);
    let points = |x: usize, y: usize| {
        vec![Series {
            name: "TM 4074".to_owned(),
            points: rows.iter().filter(|row| row[2] < 0.03).map(|row| (row[x], row[y])).collect(),
        }]
    };
    let title = "NACA 0012, Re 6 million, tripped";
    let computed = "computed";
    Part {
        heading: "NACA 0012, tripped",
        source: "C. L. Ladson, NASA TM 4074, 1988: Re 6e6, strips near the nose; lift is raised for its Mach number of 0.15. Its \
                 measured lift does not pass through nothing at 0°, which weighs on the lowest points.",
        rows: vec![
            row("lift, −4° to 12°", 0.03, lift(-90.0), Unit::Percent(1)),
            row("… from 4° on", 0.03, lift(3.0), Unit::Percent(1)),
            row("drag, −4° to 12°", 0.08, drag, Unit::Percent(1)),
            row("greatest lift", 0.07, raised * greatest_lift / measured_max - 1.0, Unit::Percent(1)),
            row("its angle", 1.5, greatest_at.to_degrees() - 17.13, Unit::Degrees(1)),
        ],
        pictures: vec![
            Picture {
                name: "naca-0012-lift",
                caption: "Lift of NACA 0012, computed and measured",
                svg: lift_chart(
                    &format!("{title}: lift"),
                    vec![line(computed, &curve, |s| (s.incidence.to_degrees(), raised * s.cl))],
                    points(0, 1),
                )
                .to_svg(),
            },
            Picture {
                name: "naca-0012-drag",
                caption: "Drag of NACA 0012, computed and measured",
                svg: drag_chart(
                    &format!("{title}: drag"),
                    vec![line(computed, &curve, |s| {
                        if s.cd < 0.03 { (s.cd, raised * s.cl) } else { (f64::NAN, f64::NAN) }
                    })],
                    points(2, 1),
                )
                .to_svg(),
            },
        ],
    }
}

/// R. J. McGhee, B. S. Walker and B. F. Millard, NASA TM 4062, 1988.
pub(crate) fn low_reynolds() -> Part {
    let table = parsed(include_str!("../reference/measured_low_re.toml"));
    let mut text = String::from("cambered section\n");
    for point in table["section"]["points"].as_array().expect("points") {
        text.push_str(&format!("{} {}\n", number(&point[0]), number(&point[1])));
    }
    let read = |_: &str, _: usize| Ok(text.clone().into_bytes());
    let section = Beside::new(&read).named("points.txt", Finish::Published).expect("a section");
    let flow = flow(&section);
    let rows = rows(&table["tm4062"]);
    let mut part = Part {
        heading: "A cambered section at low Reynolds numbers",
        source: "R. J. McGhee, B. S. Walker and B. F. Millard, NASA TM 4062, 1988: 9 % thick, free transition, quiet tunnel, at 5°. \
                 The bubble by oil flow, at 2°.",
        rows: Vec::new(),
        pictures: Vec::new(),
    };
    let (mut lifts, mut drags, mut measured) = (Vec::new(), Vec::new(), [Vec::new(), Vec::new()]);
    for row_of in &rows {
        let curve = sweep(&flow, &Conditions::free(row_of[0], 9.0), [row_of[1] - 8.0, row_of[1] + 5.0, 1.0]);
        let s = curve.solutions().find(|s| (s.incidence.to_degrees() - row_of[1]).abs() < 1e-6);
        let s = s.expect("a converged point");
        let of = format!("Re {} 000", row_of[0] / 1e3);
        part.rows.extend([
            row(format!("{of}: lift"), 0.04, s.cl / row_of[2] - 1.0, Unit::Percent(1)),
            row(format!("{of}: drag"), 0.12, s.cd / row_of[3] - 1.0, Unit::Percent(1)),
            row(format!("{of}: moment"), 0.008, s.cm - row_of[4], Unit::Plain(4)),
        ]);
        lifts.push(line(&of, &curve, by_angle));
        drags.push(line(&of, &curve, |s| (s.cd, s.cl)));
        let name = format!("TM 4062, {of}");
        measured[0].push(Series { name: name.clone(), points: vec![(row_of[1], row_of[2])] });
        measured[1].push(Series { name, points: vec![(row_of[3], row_of[2])] });
    }
    let at_two = flow.at(2f64.to_radians(), &Conditions::free(2e5, 9.0), None).expect("a converged point");
    let [separation, reattachment] = at_two.upper.bubble.expect("a bubble");
    part.rows.push(row(
        "Re 200 000: where the bubble begins, in chords",
        None,
        separation - 0.43,
        Unit::Plain(2),
    ));
    part.rows.push(row("… and where it ends", None, reattachment - 0.67, Unit::Plain(2)));
    let [by_angle, by_drag] = measured;
    let title = "Cambered section of TM 4062";
    part.pictures = vec![
        Picture {
            name: "low-reynolds-lift",
            caption: "Lift of the cambered section at low Reynolds numbers, computed and measured",
            svg: lift_chart(&format!("{title}: lift"), lifts, by_angle).to_svg(),
        },
        Picture {
            name: "low-reynolds-drag",
            caption: "Drag of the cambered section at low Reynolds numbers, computed and measured",
            svg: drag_chart(&format!("{title}: drag"), drags, by_drag).to_svg(),
        },
    ];
    part
}

/// Names of the pictures, in the order of the reference.
const REPORT_824: [(&str, &str); 4] = [
    ("report-824-0012", "Lift of NACA 0012 beside its measured slope and greatest lift"),
    ("report-824-2412", "Lift of NACA 2412 beside its measured slope and greatest lift"),
    ("report-824-4412", "Lift of NACA 4412 beside its measured slope and greatest lift"),
    ("report-824-23012", "Lift of NACA 23012 beside its measured slope and greatest lift"),
];

/// I. H. Abbott, A. E. von Doenhoff and L. S. Stivers, NACA Report 824, 1945.
pub(crate) fn report_824() -> Part {
    let table = parsed(include_str!("../reference/measured_report824.toml"));
    let mut part = Part {
        heading: "NACA sections in the low-turbulence tunnel",
        source: "I. H. Abbott, A. E. von Doenhoff and L. S. Stivers, NACA Report 824, 1945: read from its curves, from memory, to \
                 about 0.1° and 0.05 of the greatest lift; Re 5.7e6 to 6e6, smooth. The signs in the pictures stand on its slope.",
        rows: Vec::new(),
        pictures: Vec::new(),
    };
    for (entry, (picture, caption)) in table["rows"].as_array().expect("rows").iter().zip(REPORT_824) {
        let name = entry[0].as_str().expect("a section");
        assert!(picture.ends_with(name));
        let [reynolds, zero, slope, cl_max, cd_min, cm] = std::array::from_fn(|k| number(&entry[k + 1]));
        let curve = sweep(&flow(&naca(name)), &Conditions::free(reynolds, 9.0), [-6.0, 21.0, 1.0]);
        let (own_slope, own_zero) = curve.slope_and_zero_lift().expect("a slope");
        let (greatest, _) = curve.greatest_lift().expect("a greatest lift");
        let moment = curve.solutions().find(|s| s.incidence > -0.01).expect("a point").cm;
        let drag = curve.least_drag().expect("points").cd;
        part.rows.extend([
            row(format!("{name}: zero lift"), 0.3, own_zero.to_degrees() - zero, Unit::Degrees(2)),
            row(format!("{name}: slope"), 0.04, own_slope.to_radians() / slope - 1.0, Unit::Percent(1)),
            row(format!("{name}: greatest lift"), 0.08, greatest / cl_max - 1.0, Unit::Percent(1)),
            row(format!("{name}: moment"), None, moment - cm, Unit::Plain(4)),
            row(format!("{name}: least drag"), None, drag / cd_min - 1.0, Unit::Percent(1)),
        ]);
        let angles = (-3..=8).map(|i| f64::from(2 * i)).filter(|angle| slope * (angle - zero) < 0.7 * cl_max);
        let measured = Series {
            name: "Report 824".to_owned(),
            points: angles.map(|angle| (angle, slope * (angle - zero))).collect(),
        };
        let lines = vec![line("computed", &curve, by_angle)];
        let mut chart =
            lift_chart(&format!("NACA {name}, Re {} million", reynolds / 1e6), lines, vec![measured]);
        chart.marks = vec![Mark { at: cl_max, name: format!("measured {cl_max}") }];
        part.pictures.push(Picture { name: picture, caption, svg: chart.to_svg() });
    }
    part
}
