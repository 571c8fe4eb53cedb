//! Time of a converged viscous point against one LU factorisation of the size of the panel matrix
//! by LAPACK, on one thread, in the same run; see `lapack`. And a map over sections, flap angles
//! and Reynolds numbers on two threads against one.

// Printing what was measured is part of the purpose here.
#![allow(clippy::print_stdout)]

use std::hint::black_box;
use std::time::Instant;

use plankform::flow::{Conditions, LiftCurve, Panelling, Viscous};
use plankform::section::{Flap, FlapSurface, HingeHeight, Section, TrailingEdge};

mod lapack;

use lapack::{lapack_times, python, summary};

/// Both sides take turns this often, so that a change of clock or load meets both.
const ROUNDS: usize = 7;
/// Repetitions in a round.
const REPEATS: usize = 40;
const PANELS: usize = 200;
/// Maps on either number of threads.
const MAP_ROUNDS: usize = 7;

fn main() {
    point();
    map();
}

/// Sections, flap angles and Reynolds numbers on one thread and on two, by turns.
fn map() {
    let flap = |degrees: f64| Flap {
        hinge: 0.7,
        height: HingeHeight::Upper,
        angle: degrees.to_radians(),
        surface: FlapSurface::Broken,
    };
    let mut flows = Vec::new();
    for name in ["NACA 4412", "NACA 0012"] {
        let section = Section::from_designation(name, TrailingEdge::Closed).expect("a section");
        for section in [section.clone(), section.flapped(flap(8.0)).expect("a flap")] {
            let panelling = Panelling::of(&section, PANELS).expect("panels");
            flows.push(Viscous::new(&panelling).expect("a flow"));
        }
    }
    let conditions = [2e5, 5e5, 2e6].map(|reynolds| Conditions::free(reynolds, 9.0));
    let angles: Vec<f64> = (-4..=10).map(|angle| f64::from(angle).to_radians()).collect();
    let mut times = [Vec::new(), Vec::new()];
    for _ in 0..MAP_ROUNDS {
        for (threads, times) in [1, 2].into_iter().zip(&mut times) {
            let start = Instant::now();
            for flow in &flows {
                black_box(LiftCurve::sweep_on(threads, flow, &conditions, &angles).expect("curves"));
            }
            times.push(start.elapsed().as_secs_f64());
        }
    }
    let [[one, least_one], [two, least_two]] = times.map(summary);
    println!(
        "a map of {} curves: on one thread {one:.0} ms (least {least_one:.0}), on two {two:.0} ms (least {least_two:.0}), \
         {:.2} times as fast (least {:.2})",
        flows.len() * conditions.len(),
        one / two,
        least_one / least_two
    );
}

fn point() {
    let section = Section::from_designation("NACA 4412", TrailingEdge::Closed).expect("a section");
    let panelling = Panelling::of(&section, PANELS).expect("panels");
    let flow = Viscous::new(&panelling).expect("a flow");
    let conditions = Conditions::free(1e6, 9.0);
    // Points half a degree apart, as in a curve: each is started from the one before.
    let angles: Vec<f64> = (0..=16).map(|i| (0.5 * f64::from(i)).to_radians()).collect();
    let mut state = flow.at(angles[0], &conditions, None).expect("a point").state;
    let starts: Vec<_> = angles[1..]
        .iter()
        .map(|&angle| {
            let solution = flow.at(angle, &conditions, Some(&state)).expect("a point");
            (angle, std::mem::replace(&mut state, solution.state), solution.steps)
        })
        .collect();
    let steps: usize = starts.iter().map(|start| start.2).sum();
    println!(
        "{PANELS} panels, {} points with {:.1} Newton steps each",
        starts.len(),
        steps as f64 / starts.len() as f64
    );

    let python = python();
    let (mut ours, mut factoring, mut lapack) = (Vec::new(), Vec::new(), Vec::new());
    let mut trouble = None;
    for _ in 0..ROUNDS {
        for _ in 0..REPEATS / 10 {
            let start = Instant::now();
            black_box(Viscous::new(black_box(&panelling)).expect("a flow"));
            factoring.push(start.elapsed().as_secs_f64());
            let start = Instant::now();
            for (angle, state, _) in &starts {
                black_box(flow.at(*angle, &conditions, Some(state)).expect("a point"));
            }
            ours.push(start.elapsed().as_secs_f64() / starts.len() as f64);
        }
        match lapack_times(&python, PANELS, REPEATS) {
            Ok(times) => lapack.extend(times),
            Err(why) => trouble = Some(why),
        }
    }
    let ([point, least], [once, least_once]) = (summary(ours), summary(factoring));
    if let Some(why) = trouble {
        println!(
            "a point {point:.2} ms (least {least:.2}), once {once:.2} ms; no LAPACK to compare with: {why}"
        );
        return;
    }
    let [lu, least_lu] = summary(lapack);
    for (word, point, once, lu) in [("median", point, once, lu), ("least", least, least_once, least_lu)] {
        println!(
            "{word}: a point {point:.3} ms, once for the outline {once:.2} ms, LAPACK LU {lu:.3} ms, ratios {:.1} and {:.1}",
            point / lu,
            once / lu
        );
    }
}
