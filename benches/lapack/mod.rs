//! LAPACK's LU factorisation, timed in the same run as what it is compared with.
//!
//! LAPACK comes from numpy or scipy in a Python named by `PLANKFORM_PYTHON`, or that of
//! `target/outside-venv`, or `python3`.

use std::path::Path;
use std::process::Command;

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

/// The Python that LAPACK is asked of.
pub(crate) fn python() -> String {
    let ours = "target/outside-venv/bin/python";
    std::env::var("PLANKFORM_PYTHON")
        .unwrap_or_else(|_| if Path::new(ours).exists() { ours } else { "python3" }.to_owned())
}

/// Seconds that each of `repeats` factorisations took.
pub(crate) fn lapack_times(python: &str, size: usize, repeats: usize) -> Result<Vec<f64>, String> {
    let mut command = Command::new(python);
    command.args(["-c", LAPACK, &size.to_string(), &repeats.to_string()]);
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
pub(crate) fn summary(mut times: Vec<f64>) -> [f64; 2] {
    times.sort_by(f64::total_cmp);
    [times[times.len() / 2], times[0]].map(|seconds| 1e3 * seconds)
}
