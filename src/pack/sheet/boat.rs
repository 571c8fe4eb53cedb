//! The foil under its boat.

use std::fmt::Write as _;

use super::knots;
use crate::design::Design;
use crate::export::chart::{Chart, Series};
use crate::export::html::{escaped, table};
use crate::loading::Loading;
use crate::pack::duty::FoilDuty;
use crate::units::number;

/// What the whole foil carries at which speed, and what that costs.
pub(super) fn under_the_boat(body: &mut String, design: &Design, foil: &FoilDuty) {
    let _ = writeln!(
        body,
        "<h2>The foil under its boat</h2>\n<p>{:.0} kg carried at {} mm depth, flap straight. By a lifting line with the image of \
         the free surface, fed with the lift curves below, which hold for {:.1} kn. Not in it: ventilation, waves, spray, the strut, \
         shocks and gusts. Take-off needs a margin for them.</p>",
        foil.duty.carries,
        number(design.lift.depth.mm(), 0),
        knots(design.lift.speed),
    );
    match &foil.take_off {
        Ok(take_off) => {
            let _ = writeln!(
                body,
                "<p>It carries its load from <strong>{:.1} kn</strong> on, with {:.0} % of its greatest lift.</p>",
                knots(take_off.speed),
                100.0 * foil.duty.share
            );
        }
        Err(error) => {
            let _ = writeln!(body, "<p class=\"bad\">{}</p>", escaped(&error.to_string()));
        }
    }
    let rows: Vec<[String; 7]> = foil
        .named
        .iter()
        .map(|(name, point)| {
            let speed = format!("{name}, {:.1} kn", knots(point.speed));
            match &point.carried {
                Ok(loading) => [
                    speed,
                    format!("{:.2}°", loading.state.incidence.to_degrees()),
                    format!("{:.1}", loading.drag()),
                    format!("{:.1}", loading.induced_drag),
                    format!("{:.1}", loading.lift / loading.drag()),
                    format!("{:.0}", loading.power()),
                    loading.nearest_to_stall().map_or("–".to_owned(), |strip| {
                        let left = strip
                            .stall_margin
                            .map_or(String::new(), |m| format!(", {:.1}° left", m.to_degrees()));
                        format!("{:.0} mm from the root{left}", strip.at)
                    }),
                ],
                Err(error) => {
                    let dash = || "–".to_owned();
                    [speed, dash(), dash(), dash(), dash(), dash(), escaped(&error.to_string())]
                }
            }
        })
        .collect();
    let heading = [
        "speed",
        "incidence",
        "drag, N",
        "of it induced, N",
        "lift over drag",
        "power, W",
        "nearest to stall",
    ];
    body.push_str(&table(heading, &rows, |_| false));
    let line = |name: &str, value: fn(&Loading) -> f64| Series {
        name: name.to_owned(),
        points: foil
            .over_speeds
            .iter()
            .map(|p| (knots(p.speed), p.carried.as_ref().map_or(f64::NAN, value)))
            .collect(),
    };
    let chart = Chart {
        title: "Drag of the foil".to_owned(),
        across: "speed, kn".to_owned(),
        up: "drag, N".to_owned(),
        series: vec![
            line("all of it", Loading::drag),
            line("induced", |loading| loading.induced_drag),
            line("of the sections", |loading| loading.profile_drag),
        ],
        ..Chart::default()
    };
    let _ = writeln!(body, "<figure>{}</figure>", chart.to_svg());
}
