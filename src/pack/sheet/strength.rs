//! Whether it breaks: one picture of the reserve along the span, and the figures behind it.

use std::fmt::Write as _;

use crate::design::Design;
use crate::export::chart::{Chart, Dot, Mark, Series};
use crate::export::html::{escaped, table};
use crate::pack::strength::{CAUTION, Outcome, PartStrength, side};
use crate::strength::Provenance;
use crate::units::number;

/// The picture ends at so many times the reserve that is asked; above it nothing is in danger.
const SHOWN: f64 = 4.0;

pub(super) fn strength(body: &mut String, design: &Design, part: &Result<PartStrength<'_>, String>) {
    body.push_str("<h2>Will it break</h2>\n");
    let part = match part {
        Ok(part) => part,
        Err(why) => {
            let _ = writeln!(
                body,
                "<p class=\"bad\">Nothing is known of the strength of this part: {}.</p>",
                escaped(why)
            );
            return;
        }
    };
    caution(body, part);
    verdict(body, design, part);
    let _ = writeln!(
        body,
        "<figure>{}<figcaption>Strength over stress, load factors included: the lower, the nearer it is to breaking. What lies above \
         {} is drawn there.</figcaption></figure>",
        picture(design, part).to_svg(),
        number(SHOWN * design.strength.reserve, 1)
    );
    cases(body, part);
    joints(body, part);
    materials(body, design);
    body.push_str(
        "<p>A beam held where it is fitted and free at the far end; plies by classical laminate theory, first ply to fail; wrinkling of \
         the skin after Hoff and Mautner; shear in the core; buckling. Not in it: fatigue, impact, water in the core, bolts, stress at \
         the edges of cuts, hinges and ply ends, creep and heat.</p>\n",
    );
}

fn caution(body: &mut String, part: &PartStrength<'_>) {
    let untested = if part.untested.is_empty() {
        String::new()
    } else {
        format!(
            " Not tested, and so not to be relied on: <strong>{}</strong>.",
            escaped(&part.untested.join(", "))
        )
    };
    let _ = writeln!(
        body,
        "<div class=\"caution\"><strong>Take care.</strong> This is {CAUTION}.{untested} Prove a part by loading it slowly, with \
         nobody near, before a person depends on it.</div>"
    );
}

/// Where it is weakest, and what mends it.
fn verdict(body: &mut String, design: &Design, part: &PartStrength<'_>) {
    let Some(weakest) = weakest(part) else { return };
    let least = weakest.result.least();
    let passed = least.reserve.reserve >= design.strength.reserve;
    let _ = writeln!(
        body,
        "<p class=\"{}\">Weakest {} mm from the root under \u{201c}{}\u{201d}: {} at {} times the load, and {} is asked.</p>",
        if passed { "good" } else { "bad" },
        number(least.at + part.held, 0),
        escaped(&weakest.result.name),
        least.reserve.mode.words(),
        number(least.reserve.reserve, 2),
        number(design.strength.reserve, 2),
    );
    match &part.cure {
        Some(Ok(mend)) => {
            let _ = writeln!(body, "<p><strong>What mends it:</strong> {}.</p>", escaped(&mend.words()));
        }
        Some(Err(error)) => {
            let _ = writeln!(
                body,
                "<p><strong>More of its own plies do not mend it:</strong> {}. Take a thicker section, another cloth, or less load.</p>",
                escaped(&error.to_string())
            );
        }
        None => {}
    }
}

fn weakest<'a>(part: &'a PartStrength<'_>) -> Option<&'a Outcome> {
    let least = |outcome: &&Outcome| outcome.result.least().reserve.reserve;
    part.cases.iter().min_by(|a, b| least(a).total_cmp(&least(b)))
}

/// The reserve of each case along the span, the weakest place marked.
fn picture(design: &Design, part: &PartStrength<'_>) -> Chart {
    let asked = design.strength.reserve;
    let top = SHOWN * asked;
    let line = |(i, outcome): (usize, &Outcome)| Series {
        name: format!("case {}", i + 1),
        points: outcome
            .result
            .stations
            .iter()
            .map(|station| {
                let least =
                    station.reserves.iter().map(|r| r.reserve).fold(outcome.result.buckling, f64::min);
                (station.at + part.held, least.min(top))
            })
            .collect(),
    };
    let dot = weakest(part).map(|outcome| {
        let least = outcome.result.least();
        let value = least.reserve.reserve;
        Dot { at: (least.at + part.held, value.min(top)), name: format!("weakest: {}", number(value, 2)) }
    });
    Chart {
        title: "Reserve along the span".to_owned(),
        across: "mm from the root".to_owned(),
        up: "strength over stress".to_owned(),
        series: part.cases.iter().enumerate().map(line).collect(),
        marks: vec![
            Mark { at: 1.0, name: "breaks".to_owned() },
            Mark { at: asked, name: format!("asked {}", number(asked, 2)) },
            Mark { at: 0.0, name: String::new() },
        ],
        dots: dot.into_iter().collect(),
        ..Chart::default()
    }
}

fn cases(body: &mut String, part: &PartStrength<'_>) {
    let rows: Vec<[String; 9]> = part
        .cases
        .iter()
        .enumerate()
        .map(|(i, outcome)| {
            let (root, least) = (outcome.result.beam.root(), outcome.result.least());
            [
                format!("{} {}", i + 1, outcome.result.name),
                number(outcome.result.factor, 2),
                format!("{:.0}", root.shear[0].hypot(root.shear[1])),
                format!("{:.0}, {:.0}", root.moment[0] * 1e-3, root.moment[1] * 1e-3),
                format!("{:.1}", root.torque * 1e-3),
                format!("{:.2}", least.reserve.reserve.min(999.0)),
                format!("{} mm, {} side", number(least.at + part.held, 0), side(least.reserve.side)),
                least.reserve.mode.words().to_owned(),
                format!("{:.1} mm, {:.2}°", outcome.deflection(), outcome.twist().to_degrees()),
            ]
        })
        .collect();
    let heading = [
        "case",
        "load factor",
        "shear where it is held, N",
        "bending there across and along, N m",
        "torque there, N m",
        "reserve",
        "where",
        "what fails first",
        "far end without the factor: bends, twists nose up",
    ];
    body.push_str(&table(heading, &rows, |_| false));
    let in_flight = part.cases.iter().filter(|outcome| outcome.result.name.starts_with("flight"));
    if let Some(most) = in_flight.max_by(|a, b| a.twist().abs().total_cmp(&b.twist().abs())) {
        let twist = most.twist().to_degrees();
        let _ = writeln!(
            body,
            "<p>In flight it twists nose {} by {:.2}° at the tip: so much less or more incidence than it was built with, which the loads \
             above leave out.</p>",
            if twist < 0.0 { "down" } else { "up" },
            twist.abs()
        );
    }
}

fn joints(body: &mut String, part: &PartStrength<'_>) {
    if part.joints.is_empty() {
        return;
    }
    let rows: Vec<[String; 5]> = part
        .joints
        .iter()
        .map(|outcome| {
            [
                outcome.joint.purpose.clone(),
                outcome.joint.at.to_string(),
                outcome.joint.depth.to_string(),
                outcome.case.clone(),
                format!("{:.2}", outcome.reserve.min(999.0)),
            ]
        })
        .collect();
    let heading = ["glued joint", "mouth, from the root", "glued in", "worst case", "reserve of the glue"];
    body.push_str(&table(heading, &rows, |_| false));
}

fn materials(body: &mut String, design: &Design) {
    let word = |source: Provenance| match source {
        Provenance::Tested => "tested",
        Provenance::Published => "published",
        Provenance::Invented => "INVENTED: replace",
    };
    let rows: Vec<[String; 5]> = design
        .plies
        .iter()
        .filter_map(|ply| {
            let material = design.strength.materials.get(ply.material?)?;
            let m = &material.elastic;
            Some([
                m.name.clone(),
                material.form.laid_at(ply.angle),
                format!("{:.0}, {:.1}, {:.1}", m.e1 * 1e-3, m.e2 * 1e-3, m.g12 * 1e-3),
                format!("{:.0}, {:.0}, {:.0}", m.tension_along, m.compression_along, m.shear),
                word(m.provenance).to_owned(),
            ])
        })
        .chain(design.strength.core.iter().map(|core| {
            [
                core.name.clone(),
                "grain along the span".to_owned(),
                format!("{:.1}, {:.2}, {:.2}", core.along_span * 1e-3, core.across * 1e-3, core.g * 1e-3),
                format!("–, {:.1}, {:.1}", core.compression, core.shear),
                word(core.provenance).to_owned(),
            ]
        }))
        .collect();
    let heading = [
        "material",
        "laid",
        "moduli along, across, shear, GPa",
        "strength in tension, compression, shear, MPa",
        "values",
    ];
    body.push_str(&table(heading, &rows, |row| row[4].starts_with("INVENTED")));
}
