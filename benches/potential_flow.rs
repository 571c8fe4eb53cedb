//! Time of one potential flow (assemble, factor, solve) against one LU factorisation of the same
//! size by LAPACK, on one thread, in the same run.
//!
//! LAPACK comes from numpy or scipy in a Python named by `PLANKFORM_PYTHON`, or that of
//! `target/outside-venv`, or `python3`; without it only our own time is printed.

// Printing what was measured is part of the purpose here.
#![allow(clippy::print_stdout)]

use std::hint::black_box;
use std::time::Instant;

use plankform::flow::{Panelling, PotentialFlow};
use plankform::section::{Section, TrailingEdge};

mod lapack;

use lapack::{lapack_times, python, summary};

/// Both sides take turns this often, so that a change of clock or load meets both.
const ROUNDS: usize = 7;
/// Repetitions in a round.
const REPEATS: usize = 40;

fn main() {
    let section = Section::from_designation("NACA 4412", TrailingEdge::Closed).expect("a section");
    let python = python();
    for panels in [200, 400] {
        let panelling = Panelling::of(&section, panels).expect("panels");
        let (mut ours, mut lapack) = (Vec::new(), Vec::new());
        let mut trouble = None;
        for _ in 0..ROUNDS {
            ours.extend(flow_times(&panelling));
            match lapack_times(&python, panels, REPEATS) {
                Ok(times) => lapack.extend(times),
                Err(why) => trouble = Some(why),
            }
        }
        if let Some(why) = trouble {
            let [median, least] = summary(ours);
            println!(
                "{panels} panels: flow {median:.3} ms (least {least:.3}); no LAPACK to compare with: {why}"
            );
        } else {
            // The least time is what is left when nothing else wanted the processor.
            for (word, flow, lu) in std::iter::zip(summary(ours), summary(lapack))
                .zip(["median", "least"])
                .map(|((flow, lu), word)| (word, flow, lu))
            {
                println!(
                    "{panels} panels, {word}: flow {flow:.3} ms, LAPACK LU {lu:.3} ms, ratio {:.2}",
                    flow / lu
                );
            }
        }
    }
}

fn flow_times(panelling: &Panelling) -> Vec<f64> {
    let times = (0..REPEATS + 5).map(|_| {
        let start = Instant::now();
        black_box(PotentialFlow::new(black_box(panelling)).expect("flow"));
        start.elapsed().as_secs_f64()
    });
    times.skip(5).collect()
}
