//! LU factorisation with partial pivots of a matrix of some hundred rows, and solution with it.
//!
//! Halves of the columns are factored in turn (Toledo 1997, "Locality of reference in LU
//! decomposition with partial pivoting"), so that nearly all work is in products of matrices.
//! Those are left to a library. The narrow panels at the bottom of the recursion are done here,
//! column by column, the search for the pivot going along with the update.

use std::ops::Range;

use faer::linalg::matmul::matmul;
use faer::linalg::triangular_solve::{solve_unit_lower_triangular_in_place, solve_upper_triangular_in_place};
use faer::{Accum, MatMut, MatRef, Par};
use pulp::Simd;

use super::dense::dot;

/// Most columns that are eliminated one by one.
const PANEL: usize = 8;

/// Registers of a column that are worked on together.
const ABREAST: usize = 4;

/// Solves in place for the columns of `block` after its leading square of `size`. Columns lie
/// `stride` apart. A singular matrix leaves something that is not finite.
pub(super) fn solve_in_place(block: &mut [f64], stride: usize, size: usize) {
    let mut pivots = vec![0; size];
    eliminate(block, stride, 0..size, &mut pivots);
    let (square, right) = block.split_at_mut(size * stride);
    let factors = MatRef::from_column_major_slice_with_stride(square, size, size, stride);
    let columns = right.len() / stride;
    let right = MatMut::from_column_major_slice_with_stride_mut(right, size, columns, stride);
    solve_upper_triangular_in_place(factors, right, Par::Seq);
}

/// Factors the columns of `block`, as many as there are rows in a square of `size`. Returns the
/// rows that were exchanged with each diagonal in turn.
pub(super) fn factor(block: &mut [f64], stride: usize, size: usize) -> Vec<usize> {
    let mut pivots = vec![0; size];
    eliminate(&mut block[..size * stride], stride, 0..size, &mut pivots);
    pivots
}

/// Solves in place with the transpose of the matrix that was factored: for a matrix that stands in
/// the block by rows. A singular matrix leaves something that is not finite.
pub(super) fn solve_transposed(block: &[f64], stride: usize, pivots: &[usize], right: &mut [f64]) {
    let column = |k: usize| &block[k * stride..][..pivots.len()];
    for k in 0..pivots.len() {
        let column = column(k);
        right[k] = (right[k] - dot(&column[..k], &right[..k])) / column[k];
    }
    for k in (0..pivots.len()).rev() {
        right[k] -= dot(&column(k)[k + 1..], &right[k + 1..]);
    }
    for (k, &pivot) in pivots.iter().enumerate().rev() {
        right.swap(k, pivot);
    }
}

/// Eliminates below the diagonal, among the `rows`, in as many columns of `block` as there are
/// `pivots`, which become the rows, counted from the first of `rows`, that were exchanged with
/// the diagonal. Columns that follow are carried along. With such there is nobody left who would
/// use the lower factor again, and its rows stay where they are.
fn eliminate(block: &mut [f64], stride: usize, rows: Range<usize>, pivots: &mut [usize]) {
    let count = pivots.len();
    if count <= PANEL {
        let (panel, right) = block.split_at_mut(count * stride);
        pulp::Arch::new().dispatch(Panel { block: panel, stride, rows: rows.clone(), pivots });
        if !right.is_empty() {
            carry_along(panel, right, stride, rows, pivots);
        }
        return;
    }
    let half = (count / 2).next_multiple_of(PANEL);
    let (left, right) = block.split_at_mut(half * stride);
    let (left_pivots, right_pivots) = pivots.split_at_mut(half);
    eliminate(left, stride, rows.clone(), left_pivots);
    carry_along(left, right, stride, rows.clone(), left_pivots);

    let rows = rows.start + half..rows.end;
    eliminate(right, stride, rows.clone(), right_pivots);
    if right.len() == right_pivots.len() * stride {
        exchange(left, stride, rows, right_pivots);
    }
    for pivot in right_pivots {
        *pivot += half;
    }
}

/// Does to the columns of `right` what was done to those of `left`.
fn carry_along(left: &[f64], right: &mut [f64], stride: usize, rows: Range<usize>, pivots: &[usize]) {
    exchange(right, stride, rows.clone(), pivots);
    let (count, height, width) = (pivots.len(), rows.len(), right.len() / stride);
    let left = MatRef::from_column_major_slice_with_stride(&left[rows.start..], height, count, stride);
    let right = &mut right[rows.start..];
    let right = MatMut::from_column_major_slice_with_stride_mut(right, height, width, stride);
    let (triangle, lower) = left.split_at_row(count);
    let (mut upper, rest) = right.split_at_row_mut(count);
    solve_unit_lower_triangular_in_place(triangle, upper.as_mut(), Par::Seq);
    matmul(rest, Accum::Add, lower, upper.as_ref(), -1.0, Par::Seq);
}

/// Exchanges each of the first `rows` with that of its pivot, in all columns.
fn exchange(columns: &mut [f64], stride: usize, rows: Range<usize>, pivots: &[usize]) {
    let height = rows.len();
    // Four columns at a time, so that a pivot is looked up and checked once for all of them.
    let mut fours = columns.chunks_exact_mut(4 * stride);
    for four in &mut fours {
        let (a, rest) = four.split_at_mut(stride);
        let (b, rest) = rest.split_at_mut(stride);
        let (c, d) = rest.split_at_mut(stride);
        let [a, b, c, d] = [a, b, c, d].map(|column| &mut column[rows.clone()]);
        let (a, b, c, d) = (&mut a[..height], &mut b[..height], &mut c[..height], &mut d[..height]);
        for (row, &pivot) in pivots.iter().enumerate() {
            assert!(row < height && pivot < height);
            a.swap(row, pivot);
            b.swap(row, pivot);
            c.swap(row, pivot);
            d.swap(row, pivot);
        }
    }
    for column in fours.into_remainder().chunks_exact_mut(stride) {
        let column = &mut column[rows.clone()];
        for (row, &pivot) in pivots.iter().enumerate() {
            column.swap(row, pivot);
        }
    }
}

/// As [`eliminate`], of few columns with none to follow, one after the other.
struct Panel<'a> {
    block: &'a mut [f64],
    stride: usize,
    rows: Range<usize>,
    pivots: &'a mut [usize],
}

impl pulp::WithSimd for Panel<'_> {
    type Output = ();

    #[inline(always)]
    fn with_simd<S: Simd>(self, simd: S) {
        let Self { block, stride, rows, pivots } = self;
        for (k, pivot) in pivots.iter_mut().enumerate() {
            let (done, rest) = block.split_at_mut(k * stride);
            let column = &mut rest[rows.clone()];
            let before: [&[f64]; PANEL] =
                std::array::from_fn(|j| if j < k { &done[j * stride..][rows.clone()] } else { &[] });
            let most = bring_up_to_date(simd, column, &before[..k]);
            *pivot = k + place_of(most, &column[k..]);
            for column in block.chunks_exact_mut(stride) {
                column[rows.clone()].swap(k, *pivot);
            }
            let column = &mut block[k * stride..][rows.clone()];
            let inverse = 1.0 / column[k];
            for entry in &mut column[k + 1..] {
                *entry *= inverse;
            }
        }
    }
}

/// Does to a column what was done to those `before` it in the panel, when their rows have been
/// exchanged already. Returns the greatest amount of what may become the pivot.
#[inline(always)]
fn bring_up_to_date<S: Simd>(simd: S, column: &mut [f64], before: &[&[f64]]) -> f64 {
    let k = before.len();
    for (j, lower) in before.iter().enumerate() {
        let upper = column[j];
        for (entry, factor) in column[j + 1..k].iter_mut().zip(&lower[j + 1..k]) {
            *entry -= upper * factor;
        }
    }
    // What fills no register is taken from the top, so that there is one remainder only.
    let head = k + (column.len() - k) % S::F64_LANES;
    for row in k..head {
        for (j, lower) in before.iter().enumerate() {
            column[row] -= lower[row] * column[j];
        }
    }
    let (top, body) = column.split_at_mut(head);
    let (body, _) = S::as_mut_simd_f64s(body);
    let mut lower: [&[S::f64s]; PANEL] = [&[]; PANEL];
    for (lower, column) in lower.iter_mut().zip(before) {
        *lower = S::as_simd_f64s(&column[head..]).0;
    }
    let mut most = simd.splat_f64s(0.0);
    let (many, few) = body.as_chunks_mut::<ABREAST>();
    let first_of_few = many.len() * ABREAST;
    for (i, entries) in many.iter_mut().enumerate() {
        let mut values = *entries;
        for (upper, lower) in top.iter().zip(&lower[..k]) {
            let upper = simd.splat_f64s(*upper);
            for (value, &lower) in values.iter_mut().zip(&lower[i * ABREAST..][..ABREAST]) {
                *value = simd.negate_mul_add_e_f64s(upper, lower, *value);
            }
        }
        for value in values {
            most = simd.max_f64s(most, simd.abs_f64s(value));
        }
        *entries = values;
    }
    for (i, value) in few.iter_mut().enumerate() {
        for (upper, lower) in top.iter().zip(&lower[..k]) {
            *value = simd.negate_mul_add_e_f64s(simd.splat_f64s(*upper), lower[first_of_few + i], *value);
        }
        most = simd.max_f64s(most, simd.abs_f64s(*value));
    }
    top[k..].iter().fold(simd.reduce_max_f64s(most), |most, value| most.max(value.abs()))
}

/// The first of the `values` of this amount; the first of all where there is none.
#[inline(always)]
fn place_of(amount: f64, values: &[f64]) -> usize {
    // Whole stretches first: without a way out at every value they are searched in registers.
    const STRETCH: usize = 16;
    let (stretches, _) = values.as_chunks::<STRETCH>();
    let holds =
        |stretch: &[f64; STRETCH]| stretch.iter().fold(false, |any, value| any | (value.abs() == amount));
    let start = STRETCH * stretches.iter().position(holds).unwrap_or(stretches.len());
    let within = values[start..].iter().position(|value| value.abs() == amount);
    within.map_or(0, |within| start + within)
}

#[cfg(test)]
#[allow(clippy::print_stdout)]
mod tests {
    use super::*;

    /// Evenly spread over [-0.5, 0.5): a multiplicative congruential sequence.
    fn scattered(count: usize) -> Vec<f64> {
        let mut state = 1_u64;
        let mut next = || {
            state = state * 48271 % 0x7fff_ffff;
            state as f64 / f64::from(0x7fff_ffff) - 0.5
        };
        (0..count).map(|_| next()).collect()
    }

    #[test]
    fn solves_what_was_multiplied_out() {
        for size in [1, 2, 7, 8, 9, 16, 17, 40, 101, 201, 230] {
            let stride = size + 3;
            let mut block = scattered((size + 2) * stride);
            let wanted = scattered(2 * size);
            for right in 0..2 {
                for row in 0..size {
                    let sum = |column: usize| block[column * stride + row] * wanted[right * size + column];
                    block[(size + right) * stride + row] = (0..size).map(sum).sum();
                }
            }
            solve_in_place(&mut block, stride, size);
            let worst = (0..2 * size)
                .map(|i| (block[(size + i / size) * stride + i % size] - wanted[i]).abs())
                .fold(0.0, f64::max);
            println!("{size} unknowns: greatest error {worst:.1e}");
            assert!(worst < 1e-10, "{size}: {worst:e}");
        }
    }

    #[test]
    fn solves_by_rows_what_was_multiplied_out() {
        for size in [1, 2, 9, 40, 101, 230] {
            let stride = size + 3;
            let mut block = scattered(size * stride);
            let wanted = scattered(size);
            let row = |i: usize| &block[i * stride..][..size];
            let mut right: Vec<f64> = (0..size).map(|i| dot(row(i), &wanted)).collect();
            let pivots = factor(&mut block, stride, size);
            solve_transposed(&block, stride, &pivots, &mut right);
            let worst = right.iter().zip(&wanted).map(|(a, b)| (a - b).abs()).fold(0.0, f64::max);
            println!("{size} unknowns by rows: greatest error {worst:.1e}");
            assert!(worst < 1e-10, "{size}: {worst:e}");
        }
    }

    #[test]
    fn exchanges_rows_where_the_diagonal_is_nought() {
        let size = 50;
        let mut block = vec![0.0; (size + 1) * size];
        for column in 0..size {
            block[column * size + (column + 20) % size] = 2.0;
            block[size * size + (column + 20) % size] = 2.0 * column as f64;
        }
        solve_in_place(&mut block, size, size);
        let solution = &block[size * size..];
        assert!(solution.iter().enumerate().all(|(i, &value)| value == i as f64), "{solution:?}");
    }

    #[test]
    fn singular_matrix_leaves_nothing_finite_to_trust() {
        let size = 30;
        let mut block = scattered((size + 1) * size);
        block.copy_within(0..size, 12 * size);
        for row in 0..size {
            block[5 * size + row] = 0.0;
        }
        solve_in_place(&mut block, size, size);
        assert!(block[size * size..].iter().any(|value| !value.is_finite()));
    }
}
