//! Numbers that carry their derivatives: forward differentiation of the boundary-layer equations,
//! so that Newton's method has the exact slopes of what is written in `closure.rs` and its
//! neighbours.

use std::ops::{Add, AddAssign, Div, Mul, Neg, Sub};

/// A value with its derivatives by `N` independent variables; with none of them a plain number.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Dual<const N: usize> {
    pub(super) value: f64,
    pub(super) slope: [f64; N],
}

impl<const N: usize> Dual<N> {
    pub(super) const fn constant(value: f64) -> Self {
        Self { value, slope: [0.0; N] }
    }

    /// The independent variable of this number.
    pub(super) fn variable(value: f64, index: usize) -> Self {
        let mut slope = [0.0; N];
        slope[index] = 1.0;
        Self { value, slope }
    }

    /// The same number as a function of more variables: those it has become `places` of them.
    pub(super) fn among<const M: usize>(self, places: [usize; N]) -> Dual<M> {
        let mut slope = [0.0; M];
        for (place, value) in places.into_iter().zip(self.slope) {
            slope[place] += value;
        }
        Dual { value: self.value, slope }
    }

    /// A function of this number with the given value and derivative.
    fn chain(self, value: f64, derivative: f64) -> Self {
        Self { value, slope: self.slope.map(|slope| slope * derivative) }
    }

    pub(super) fn recip(self) -> Self {
        let value = 1.0 / self.value;
        self.chain(value, -value * value)
    }

    pub(super) fn square(self) -> Self {
        self.chain(self.value * self.value, 2.0 * self.value)
    }

    pub(super) fn sqrt(self) -> Self {
        let value = self.value.sqrt();
        self.chain(value, 0.5 / value)
    }

    pub(super) fn ln(self) -> Self {
        self.chain(self.value.ln(), 1.0 / self.value)
    }

    pub(super) fn exp(self) -> Self {
        let value = self.value.exp();
        self.chain(value, value)
    }

    pub(super) fn tanh(self) -> Self {
        let value = self.value.tanh();
        self.chain(value, 1.0 - value * value)
    }

    /// To a constant power; the number must be positive.
    pub(super) fn powf(self, power: f64) -> Self {
        let value = self.value.powf(power);
        self.chain(value, power * value / self.value)
    }

    /// The greater of this and a constant.
    pub(super) fn at_least(self, bound: f64) -> Self {
        if self.value < bound { Self::constant(bound) } else { self }
    }

    /// The smaller of this and a constant.
    pub(super) fn at_most(self, bound: f64) -> Self {
        if self.value > bound { Self::constant(bound) } else { self }
    }
}

impl<const N: usize> Add for Dual<N> {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        let mut slope = self.slope;
        for (slope, more) in slope.iter_mut().zip(other.slope) {
            *slope += more;
        }
        Self { value: self.value + other.value, slope }
    }
}

impl<const N: usize> Sub for Dual<N> {
    type Output = Self;
    fn sub(self, other: Self) -> Self {
        let mut slope = self.slope;
        for (slope, less) in slope.iter_mut().zip(other.slope) {
            *slope -= less;
        }
        Self { value: self.value - other.value, slope }
    }
}

impl<const N: usize> Mul for Dual<N> {
    type Output = Self;
    fn mul(self, other: Self) -> Self {
        let mut slope = self.slope;
        for (slope, more) in slope.iter_mut().zip(other.slope) {
            *slope = *slope * other.value + more * self.value;
        }
        Self { value: self.value * other.value, slope }
    }
}

impl<const N: usize> Div for Dual<N> {
    type Output = Self;
    fn div(self, other: Self) -> Self {
        let inverse = 1.0 / other.value;
        let value = self.value * inverse;
        let mut slope = self.slope;
        for (slope, less) in slope.iter_mut().zip(other.slope) {
            *slope = (*slope - value * less) * inverse;
        }
        Self { value, slope }
    }
}

impl<const N: usize> Neg for Dual<N> {
    type Output = Self;
    fn neg(self) -> Self {
        self.chain(-self.value, -1.0)
    }
}

impl<const N: usize> AddAssign for Dual<N> {
    fn add_assign(&mut self, other: Self) {
        *self = *self + other;
    }
}

impl<const N: usize> Add<f64> for Dual<N> {
    type Output = Self;
    fn add(self, other: f64) -> Self {
        Self { value: self.value + other, ..self }
    }
}

impl<const N: usize> Sub<f64> for Dual<N> {
    type Output = Self;
    fn sub(self, other: f64) -> Self {
        Self { value: self.value - other, ..self }
    }
}

impl<const N: usize> Mul<f64> for Dual<N> {
    type Output = Self;
    fn mul(self, other: f64) -> Self {
        self.chain(self.value * other, other)
    }
}

impl<const N: usize> Mul<Dual<N>> for f64 {
    type Output = Dual<N>;
    fn mul(self, other: Dual<N>) -> Dual<N> {
        other * self
    }
}

impl<const N: usize> Sub<Dual<N>> for f64 {
    type Output = Dual<N>;
    fn sub(self, other: Dual<N>) -> Dual<N> {
        other.chain(self - other.value, -1.0)
    }
}

impl<const N: usize> Div<f64> for Dual<N> {
    type Output = Self;
    fn div(self, other: f64) -> Self {
        self * (1.0 / other)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Each rule against a central difference.
    #[test]
    fn slopes_agree_with_differences() {
        let function = |x: Dual<2>, y: Dual<2>| {
            let quotient = (x * y - x / y + 2.0) / (x.square() + 1.0);
            (quotient.exp() + y.tanh() * x.sqrt() - (x + y).ln()).square() * y.powf(1.3) + x.recip()
                - 3.0 * -y
        };
        let value = |x: f64, y: f64| function(Dual::constant(x), Dual::constant(y)).value;
        let (x, y, step) = (1.7, 0.6, 1e-5);
        let got = function(Dual::variable(x, 0), Dual::variable(y, 1)).slope;
        let by_x = (value(x + step, y) - value(x - step, y)) / (2.0 * step);
        let by_y = (value(x, y + step) - value(x, y - step)) / (2.0 * step);
        assert!((got[0] - by_x).abs() < 1e-8 && (got[1] - by_y).abs() < 1e-8, "{got:?} {by_x} {by_y}");
    }
}
