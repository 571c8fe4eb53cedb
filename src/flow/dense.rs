//! Sums over rows as long as there are stations, in vector registers.

/// Σ a b.
pub(super) fn dot(a: &[f64], b: &[f64]) -> f64 {
    pulp::Arch::new().dispatch(
        #[inline(always)]
        || {
            const ABREAST: usize = 16;
            let mut sums = [0.0; ABREAST];
            let (a_many, a_few) = a.as_chunks::<ABREAST>();
            let (b_many, b_few) = b.as_chunks::<ABREAST>();
            for (a, b) in a_many.iter().zip(b_many) {
                for k in 0..ABREAST {
                    sums[k] += a[k] * b[k];
                }
            }
            let rest: f64 = a_few.iter().zip(b_few).map(|(a, b)| a * b).sum();
            rest + sums.iter().sum::<f64>()
        },
    )
}

/// Adds `factor` times another row.
pub(super) fn add(row: &mut [f64], factor: f64, other: &[f64]) {
    if factor != 0.0 {
        for (entry, value) in row.iter_mut().zip(other) {
            *entry += factor * value;
        }
    }
}

/// Sets three rows to sums of four others: `weights` has the factors of the others for each. Rows
/// that are longer than the shortest keep what they have behind its end.
pub(super) fn combine(rows: [&mut [f64]; 3], weights: &[[f64; 4]; 3], others: [&[f64]; 4]) {
    let count = others.iter().map(|row| row.len()).chain(rows.iter().map(|row| row.len())).min().unwrap_or(0);
    let [p, q, r] = rows;
    let (p, q, r) = (&mut p[..count], &mut q[..count], &mut r[..count]);
    let [a, b, c, d] = others.map(|row| &row[..count]);
    let [u, v, w] = weights;
    pulp::Arch::new().dispatch(
        #[inline(always)]
        || {
            for i in 0..count {
                let (a, b, c, d) = (a[i], b[i], c[i], d[i]);
                p[i] = u[0] * a + u[1] * b + u[2] * c + u[3] * d;
                q[i] = v[0] * a + v[1] * b + v[2] * c + v[3] * d;
                r[i] = w[0] * a + w[1] * b + w[2] * c + w[3] * d;
            }
        },
    );
}
