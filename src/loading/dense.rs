//! A small system of linear equations, as many as there are strips.

/// Solves `matrix · x = right` by elimination with row exchange; `matrix` row by row. `None` when the
/// matrix is singular or not finite. A few dozen unknowns: a blocked solver would bring nothing.
pub(super) fn solve(mut matrix: Vec<Vec<f64>>, mut right: Vec<f64>) -> Option<Vec<f64>> {
    let n = right.len();
    for k in 0..n {
        let pivot = (k..n).max_by(|&a, &b| matrix[a][k].abs().total_cmp(&matrix[b][k].abs()))?;
        matrix.swap(k, pivot);
        right.swap(k, pivot);
        let (upper, lower) = matrix.split_at_mut(k + 1);
        let row = &upper[k];
        for (below, i) in lower.iter_mut().zip(k + 1..) {
            let share = below[k] / row[k];
            if share != 0.0 {
                for (value, from) in below[k..].iter_mut().zip(&row[k..]) {
                    *value -= share * from;
                }
                right[i] -= share * right[k];
            }
        }
    }
    for k in (0..n).rev() {
        let known: f64 = (k + 1..n).map(|j| matrix[k][j] * right[j]).sum();
        right[k] = (right[k] - known) / matrix[k][k];
    }
    right.iter().all(|value| value.is_finite()).then_some(right)
}
