//! Time of one potential flow (assemble, factor, solve) against one LU factorisation of the same
//! size by LAPACK, on one thread, in the same run.
//!
//! LAPACK comes from numpy or scipy in a Python named by `PLANKFORM_PYTHON`, or that of
//! `target/outside-venv`, or `python3`; without it only our own time is printed.

// Printing what was measured is part of the purpose here.
#![allow(clippy::print_stdout)]

use std::hint::black_box;
use std::path::Path;
use std::process::Command;
use std::time::Instant;

use plankform::flow::{Panelling, PotentialFlow};
use plankform::section::{Section, TrailingEdge};

/// Both sides take turns this often, so that a change of clock or load meets both.
const ROUNDS: usize = 7;
/// Repetitions in a round.
const REPEATS: usize = 40;

/// Times `dgetrf` by itself, on a matrix already in its order of storage.
const LAPACK: &str = r"
import sys, time
import numpy
from scipy.linalg.lapack import dgetrf
size, repeats = int(sys.argv[1]), int(sys.argv[2])
matrix = numpy.asfortranarray(numpy.random.default_rng(1).standard_normal((size, size)))
times = []
for _ in range(repeats + 5):
    copy = matrix.copy(order='F')
    start = time.perf_counter()
    dgetrf(copy, overwrite_a=1)
    times.append(time.perf_counter() - start)
print(' '.join(repr(t) for t in times[5:]))
";

fn main() {
    let section = Section::from_designation("NACA 4412", TrailingEdge::Closed).expect("a section");
    let python = python();
    for panels in [200, 400] {
        let panelling = Panelling::of(&section, panels).expect("panels");
        let (mut ours, mut lapack) = (Vec::new(), Vec::new());
        let mut trouble = None;
        for _ in 0..ROUNDS {
            ours.extend(flow_times(&panelling));
            match lapack_times(&python, panels) {
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

fn python() -> String {
    let ours = "target/outside-venv/bin/python";
    std::env::var("PLANKFORM_PYTHON")
        .unwrap_or_else(|_| if Path::new(ours).exists() { ours } else { "python3" }.to_owned())
}

fn lapack_times(python: &str, size: usize) -> Result<Vec<f64>, String> {
    let mut command = Command::new(python);
    command.args(["-c", LAPACK, &size.to_string(), &REPEATS.to_string()]);
    for variable in ["OPENBLAS_NUM_THREADS", "OMP_NUM_THREADS", "MKL_NUM_THREADS"] {
        command.env(variable, "1");
    }
    // Settings that would hold the library below the speed of this processor.
    for variable in ["OPENBLAS_CORETYPE", "OPENBLAS_L2_SIZE"] {
        command.env_remove(variable);
    }
    let output = command.output().map_err(|error| format!("{python} does not start: {error}"))?;
    if !output.status.success() {
        let text = String::from_utf8_lossy(&output.stderr);
        return Err(format!("{python}: {}", text.lines().last().unwrap_or("it failed")));
    }
    let text = String::from_utf8_lossy(&output.stdout);
    text.split_whitespace().map(|word| word.parse().map_err(|_| format!("{python} wrote {word}"))).collect()
}

/// Median and least, in milliseconds.
fn summary(mut times: Vec<f64>) -> [f64; 2] {
    times.sort_by(f64::total_cmp);
    [times[times.len() / 2], times[0]].map(|seconds| 1e3 * seconds)
}
