//! Whether one rectangle has room in another.

/// Whether a rectangle lies within another, at any angle.
///
/// Source: W. B. Carver, solution to problem E 1225, American Mathematical Monthly 64 (1957); from
/// memory.
#[must_use]
pub fn rectangle_fits(piece: [f64; 2], room: [f64; 2]) -> bool {
    let ([p, q], [a, b]) = (longer_first(piece), longer_first(room));
    let diagonal = p * p + q * q;
    (p <= a && q <= b)
        || (p > a && b * diagonal >= 2.0 * p * q * a + (p * p - q * q) * (diagonal - a * a).sqrt())
}

fn longer_first([a, b]: [f64; 2]) -> [f64; 2] {
    if a >= b { [a, b] } else { [b, a] }
}

#[cfg(test)]
mod tests {
    use super::rectangle_fits as fits;

    #[test]
    fn a_long_piece_may_lie_across_the_corners() {
        // A thin rod goes as far as the diagonal, 311.1 for 220 square.
        assert!(fits([311.0, 0.01], [220.0, 220.0]) && !fits([311.2, 0.01], [220.0, 220.0]));
        // At 45 degrees a square of side s holds a piece whose sides add up to s times root two.
        assert!(fits([250.0, 61.0], [220.0, 220.0]) && !fits([250.0, 62.0], [220.0, 220.0]));
        assert!(fits([100.0, 220.0], [220.0, 100.0]) && !fits([100.0, 221.0], [220.0, 100.0]));
        assert!(!fits([150.0, 150.0], [1000.0, 149.0]));
    }
}
