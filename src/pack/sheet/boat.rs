//! The foil under its boat: what it carries at which speed, what that costs, and where it ends.

use std::fmt::Write as _;

use super::knots;
use crate::design::{Boat, Design};
use crate::export::chart::{Chart, Mark, Series};
use crate::export::html::{escaped, table};
use crate::loading::Loading;
use crate::pack::duty::{Flight, FoilDuty, works};
use crate::units::number;

pub(super) fn under_the_boat(body: &mut String, design: &Design, foil: &FoilDuty) {
    let _ = writeln!(
        body,
        "<h2>The foil under its boat</h2>\n<div class=\"caution\"><strong>Foils at speed injure people.</strong> Not in these figures: \
         ventilation, waves, spray, the strut, weed and debris, impact, gusts and turns. Start in sheltered water with a chase boat; local \
         rules and qualified advice come first.</div>\n<p>By a lifting line with the image of the free surface, fed with each \
         section's curve at the Reynolds number of each speed{}.</p>",
        if design.flap.is_some() { " and at three flap angles" } else { "" }
    );
    take_off(body, foil);
    flights(body, design, foil);
    if let Some(boat) = &design.boat {
        balance(body, boat, foil);
    }
    window(body, foil);
    charts(body, foil);
    sizes(body, foil);
}

fn take_off(body: &mut String, foil: &FoilDuty) {
    match &foil.take_off {
        Ok(take_off) => {
            let _ = writeln!(
                body,
                "<p>It carries its {:.0} N from <strong>{:.1} kn</strong> on, flap straight, with {:.0} % of its greatest lift.</p>",
                foil.load,
                knots(take_off.speed),
                100.0 * foil.duty.share
            );
        }
        Err(error) => {
            let _ = writeln!(body, "<p class=\"bad\">{}</p>", escaped(&error.to_string()));
        }
    }
    if let Some(set_at) = foil.set_at {
        let _ = writeln!(
            body,
            "<p>Set on the boat at <strong>{:.2}°</strong> of incidence of its root's chord, it is held level by its flap.</p>",
            set_at.to_degrees()
        );
    }
}

fn dash() -> String {
    "–".to_owned()
}

fn flights(body: &mut String, design: &Design, foil: &FoilDuty) {
    let rows: Vec<[String; 8]> = foil
        .flights
        .iter()
        .map(|flight| {
            let speed =
                format!("{}, {:.1} kn, {:.0} mm deep", flight.name, knots(flight.speed), flight.depth);
            let angle = |value: f64| format!("{:.2}°", value.to_degrees());
            let straight = flight.level.as_ref().map_or(dash(), |l| angle(l.state.incidence));
            let flap = match &flight.flapped {
                Some(Ok(loading)) => angle(loading.state.flap),
                Some(Err(error)) => escaped(&error.to_string()),
                None => dash(),
            };
            match flight.loading() {
                Ok(loading) => [
                    speed,
                    format!("{:.0}", flight.load),
                    straight,
                    flap,
                    format!("{:.1}, of it {:.1} induced", loading.drag(), loading.induced_drag),
                    format!("{:.0}, {:.1}", loading.power(), loading.lift / loading.drag()),
                    loading
                        .nearest_to_stall()
                        .and_then(|s| Some((s.at, s.stall_margin?)))
                        .map_or(dash(), |s| format!("{:.1}° left at {:.0} mm", s.1.to_degrees(), s.0)),
                    flight
                        .inception
                        .map_or(dash(), |(speed, at)| format!("{:.1} kn, first at {at:.0} mm", knots(speed))),
                ],
                Err(error) => [
                    speed,
                    format!("{:.0}", flight.load),
                    escaped(&error.to_string()),
                    flap,
                    dash(),
                    dash(),
                    dash(),
                    dash(),
                ],
            }
        })
        .collect();
    let heading = [
        "speed",
        "load, N",
        "incidence, flap straight",
        "flap as it is set, down positive",
        "drag, N",
        "power, W; lift over drag",
        "nearest to stall",
        "boils at this load from",
    ];
    body.push_str(&table(heading, &rows, |_| false));
    let rows: Vec<[String; 6]> = foil
        .flights
        .iter()
        .filter_map(|flight| {
            let [depth, incidence, flap] = flight.stiffness?;
            let horn = design.flap.and_then(|flap| flap.horn);
            let moment = flight.hinge_moment;
            let force = moment.zip(horn).map(|(moment, horn)| moment / (1e-3 * horn.mm()));
            Some([
                flight.name.to_owned(),
                format!("{incidence:.0}"),
                if foil.set_at.is_some() { format!("{flap:.0}") } else { dash() },
                format!("{:.1}", 10.0 * depth),
                moment.map_or(dash(), |moment| format!("{moment:.2}")),
                force.map_or(dash(), |force| format!("{force:.0}")),
            ])
        })
        .collect();
    let heading = [
        "speed",
        "lift for each degree of incidence, N",
        "for each degree of flap, N",
        "for each 10 mm deeper, N",
        "moment about the flap's hinge, both halves, tail down, N m",
        "force of the control rod, N",
    ];
    body.push_str(&table(heading, &rows, |_| false));
}

/// How both foils share the boat.
fn balance(body: &mut String, boat: &Boat, foil: &FoilDuty) {
    let _ = writeln!(
        body,
        "<h3>Balance</h3>\n<p>{:.0} kg fly{}. A sail's drive of {:.0} N, {:.0} mm above the drag, presses the bow down; both foils' own \
         moments are in the shares.</p>",
        boat.mass,
        if boat.heel > 0.0 {
            format!(
                ", heeled by {:.0}°, so that the foils lift the weight over its cosine",
                boat.heel.to_degrees()
            )
        } else {
            String::new()
        },
        boat.drive,
        boat.effort_height
    );
    let rows: Vec<[String; 6]> = foil
        .flights
        .iter()
        .filter_map(|flight| {
            let partner = flight.partner.as_ref()?;
            let carried = partner.carried.as_ref().ok();
            let incidence = carried.map(|loading| loading.state.incidence);
            Some([
                flight.name.to_owned(),
                format!("{:.0}, {:.0}", flight.load, partner.load),
                incidence.map_or_else(
                    || partner.carried.as_ref().err().map_or(dash(), |e| escaped(&e.to_string())),
                    |angle| format!("{:.2}°", angle.to_degrees()),
                ),
                partner.downwash.map_or(dash(), |angle| format!("{:.2}°", angle.to_degrees())),
                incidence
                    .zip(partner.downwash)
                    .map_or(dash(), |(angle, down)| format!("{:.2}°", (angle + down).to_degrees())),
                carried.map_or(dash(), |loading| format!("{:.1}", loading.drag())),
            ])
        })
        .collect();
    if rows.is_empty() {
        return;
    }
    let name = foil.flights.iter().find_map(|flight| Some(flight.partner.as_ref()?.name.clone()));
    let _ =
        writeln!(body, "<p>The other foil is \u{201c}{}\u{201d}.</p>", escaped(&name.unwrap_or_default()));
    let heading = [
        "speed",
        "this foil and the other carry, N",
        "incidence of the other to the flow there",
        "this foil turns the flow down there by",
        "so the other is set, to the level boat",
        "its drag, N",
    ];
    body.push_str(&table(heading, &rows, |_| false));
}

/// The window in which the foil works.
fn window(body: &mut String, foil: &FoilDuty) {
    let line = |name: &str, value: fn(&crate::pack::duty::Limits) -> f64| Series {
        name: name.to_owned(),
        points: foil.window.iter().map(|l| (knots(l.speed), value(l))).collect(),
    };
    let top = 3.0 * foil.load;
    let cut = |mut series: Series| {
        // Below no lift at all the foil has no business.
        series.points.iter_mut().for_each(|p| p.1 = if p.1 < 0.0 { f64::NAN } else { p.1.min(top) });
        series
    };
    let mut series = vec![
        cut(line("stalls above", |l| l.stall)),
        cut(line("boils above", |l| l.boils_above)),
        cut(line("boils below", |l| l.boils_below)),
    ];
    series.retain(|series| series.points.iter().any(|point| point.1.is_finite()));
    let chart = Chart {
        title: "The window in which this foil works".to_owned(),
        across: "speed, kn".to_owned(),
        up: "lift, N".to_owned(),
        series,
        marks: vec![
            Mark { at: foil.load, name: format!("load {:.0} N", foil.load) },
            Mark { at: 0.0, name: String::new() },
        ],
        ..Chart::default()
    };
    let (from, to) = works(&foil.window, foil.load);
    let fastest = foil.window.last().map_or(0.0, |limits| limits.speed);
    let words = match (from, to) {
        (Some(from), Some(to)) if to > from => {
            format!(
                "It carries its load from {:.1} kn, where it stalls, to {:.1} kn, where the water boils.",
                knots(from),
                knots(to)
            )
        }
        (Some(from), None) => format!(
            "It carries its load from {:.1} kn, where it stalls, and to {:.1} kn the water does not boil.",
            knots(from),
            knots(fastest)
        ),
        _ => "There is no speed among these at which it carries its load without stalling or boiling."
            .to_owned(),
    };
    let _ = writeln!(
        body,
        "<figure>{}<figcaption>{words} Flap straight, no margin; cut off at three times the load.</figcaption></figure>",
        chart.to_svg()
    );
}

fn charts(body: &mut String, foil: &FoilDuty) {
    let over_speeds = |name: &str, value: fn(&Loading) -> f64| Series {
        name: name.to_owned(),
        points: foil
            .over_speeds
            .iter()
            .map(|p| (knots(p.speed), p.carried.as_ref().map_or(f64::NAN, value)))
            .collect(),
    };
    let lift = foil.lift_curves.iter().map(|(flap, points)| Series {
        name: if foil.lift_curves.len() == 1 {
            String::new()
        } else {
            format!("flap {}°", number(flap.to_degrees(), 1))
        },
        points: points.clone(),
    });
    let along = |flight: &Flight| {
        let loading = flight.loading().ok()?;
        let points = loading.strips.iter().map(|strip| (strip.at, strip.lift_per_mm)).collect();
        Some(Series { name: flight.name.to_owned(), points })
    };
    let charts = [
        Chart {
            title: format!("Lift of the foil at {:.1} kn", knots(foil.duty.take_off)),
            across: "incidence of the root's chord, degrees".to_owned(),
            up: "lift, N".to_owned(),
            series: lift.collect(),
            marks: vec![Mark { at: foil.load, name: format!("load {:.0} N", foil.load) }],
            ..Chart::default()
        },
        Chart {
            title: "Load along the span".to_owned(),
            across: "mm from the root".to_owned(),
            up: "lift on each mm, N".to_owned(),
            series: foil.flights.iter().filter_map(along).collect(),
            marks: vec![Mark { at: 0.0, name: String::new() }],
            ..Chart::default()
        },
        Chart {
            title: "Drag of the foil, flap straight".to_owned(),
            across: "speed, kn".to_owned(),
            up: "drag, N".to_owned(),
            series: vec![
                over_speeds("all of it", Loading::drag),
                over_speeds("induced", |loading| loading.induced_drag),
                over_speeds("of the sections", |loading| loading.profile_drag),
            ],
            marks: vec![Mark { at: 0.0, name: String::new() }],
            ..Chart::default()
        },
    ];
    for chart in charts {
        let _ = writeln!(body, "<figure>{}</figure>", chart.to_svg());
    }
}

/// Other areas and spans that would do.
fn sizes(body: &mut String, foil: &FoilDuty) {
    let rows: Vec<[String; 5]> = foil
        .sizes
        .iter()
        .map(|size| {
            [
                format!("{:.0}", size.span),
                format!("{:.0}", 1e-2 * size.area),
                format!("{:.0}", size.root),
                format!("{:.1}", size.span * size.span / size.area),
                size.drag.map_or(dash(), |drag| format!("{drag:.1}")),
            ]
        })
        .collect();
    if rows.is_empty() {
        return;
    }
    let _ = writeln!(
        body,
        "<h3>What else would carry it</h3>\n<p>Foils of these sections and this taper that carry {:.0} N at {:.1} kn with {:.0} % of their \
         greatest lift, flap straight; sections read at the design's own Reynolds numbers. A longer, narrower foil has less drag and \
         bends and twists more.</p>",
        foil.load,
        knots(foil.duty.take_off),
        100.0 * foil.duty.share
    );
    let heading = [
        "span, mm",
        "area, cm²",
        "chord of the root, mm",
        "aspect ratio",
        "drag at cruise or the fastest, N",
    ];
    body.push_str(&table(heading, &rows, |_| false));
}
