//! Arithmetic of series cut off after the third power: exact derivatives without symbols.

use std::ops::{Add, Div, Mul, Neg, Sub};

/// A value with its first three derivatives with respect to one variable.
///
/// Held as the coefficients of a Taylor series, c₀ + c₁h + c₂h² + c₃h³. An order that has no
/// finite value is no finite number, and leaves the orders below it sound.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Taylor([f64; 4]);

impl Taylor {
    /// A value that does not vary.
    #[must_use]
    pub fn constant(value: f64) -> Self {
        Self([value, 0.0, 0.0, 0.0])
    }

    /// The variable itself at `value`.
    #[must_use]
    pub fn variable(value: f64) -> Self {
        Self([value, 1.0, 0.0, 0.0])
    }

    /// From the coefficients of 1, h, h² and h³.
    #[must_use]
    pub fn from_coefficients(coefficients: [f64; 4]) -> Self {
        Self(coefficients)
    }

    /// The value.
    #[must_use]
    pub fn value(&self) -> f64 {
        self.0[0]
    }

    /// Value, first, second and third derivative.
    #[must_use]
    pub fn derivatives(&self) -> [f64; 4] {
        let [c0, c1, c2, c3] = self.0;
        [c0, c1, 2.0 * c2, 6.0 * c3]
    }

    /// Whether it is below nought here or, where it is nought, just ahead.
    pub(super) fn is_negative(&self) -> bool {
        self.0.into_iter().find(|c| *c != 0.0).is_some_and(|c| c < 0.0)
    }

    fn is_constant(&self) -> bool {
        self.0[1..].iter().all(|c| *c == 0.0)
    }

    /// A function of this whose value and first three derivatives at the value are given.
    pub(super) fn chained(self, [f, f1, f2, f3]: [f64; 4]) -> Self {
        if self.is_constant() {
            return Self::constant(f);
        }
        let [_, a1, a2, a3] = self.0;
        Self([f, f1 * a1, f1 * a2 + 0.5 * f2 * a1 * a1, f1 * a3 + f2 * a1 * a2 + f3 * a1 * a1 * a1 / 6.0])
    }

    /// This to a power that varies too.
    #[must_use]
    pub fn to_power(self, power: Self) -> Self {
        if power.is_constant() {
            return self.to_constant(power.value());
        }
        let a = self.value();
        let logarithm = self.chained([a.ln(), 1.0 / a, -1.0 / (a * a), 2.0 / (a * a * a)]);
        let exponent = power * logarithm;
        exponent.chained([exponent.value().exp(); 4])
    }

    /// This to a power that does not vary. A square root of something that vanishes as a square
    /// is smooth on the side of the greater variable, and so are its like; those are resolved.
    #[must_use]
    pub fn to_constant(self, power: f64) -> Self {
        let a = self.value();
        let whole = power >= 0.0 && power.fract() == 0.0;
        if a != 0.0 || whole || !power.is_finite() {
            // A whole power runs out of derivatives, and nought times infinity must not spoil that.
            let mut factor = 1.0;
            let derivatives = [0.0, 1.0, 2.0, 3.0].map(|order: f64| {
                let here = if factor == 0.0 { 0.0 } else { factor * a.powf(power - order) };
                factor *= power - order;
                here
            });
            return self.chained(derivatives);
        }
        let Some(lead) = self.0.iter().position(|c| *c != 0.0) else {
            return Self::constant(a.powf(power));
        };
        // hᵐ (cₘ + cₘ₊₁h + …) to the power p is hᵐᵖ times a series without a zero.
        let rise = lead as f64 * power;
        if power < 0.0 || rise.fract() != 0.0 {
            return Self([0.0, 1.0, 2.0, 3.0].map(|order| {
                let vanishes = power > 0.0 && (order == 0.0 || order < rise && self.0[lead] > 0.0);
                if vanishes { 0.0 } else { f64::NAN }
            }));
        }
        let mut rest = [f64::NAN; 4];
        for (into, from) in rest.iter_mut().zip(&self.0[lead..]) {
            *into = *from;
        }
        let series = Self(rest).to_constant(power).0;
        let mut risen = [0.0; 4];
        for (order, into) in risen.iter_mut().enumerate() {
            if order as f64 >= rise {
                *into = series[order - rise as usize];
            } else if order > 0 && series[0].is_nan() {
                *into = f64::NAN;
            }
        }
        Self(risen)
    }
}

impl Add for Taylor {
    type Output = Self;

    fn add(self, other: Self) -> Self {
        Self(std::array::from_fn(|k| self.0[k] + other.0[k]))
    }
}

impl Sub for Taylor {
    type Output = Self;

    fn sub(self, other: Self) -> Self {
        Self(std::array::from_fn(|k| self.0[k] - other.0[k]))
    }
}

impl Neg for Taylor {
    type Output = Self;

    fn neg(self) -> Self {
        Self(self.0.map(|c| -c))
    }
}

impl Mul for Taylor {
    type Output = Self;

    fn mul(self, other: Self) -> Self {
        Self(std::array::from_fn(|k| (0..=k).map(|i| self.0[i] * other.0[k - i]).sum()))
    }
}

impl Div for Taylor {
    type Output = Self;

    fn div(self, other: Self) -> Self {
        let mut quotient = [0.0; 4];
        for k in 0..4 {
            let known: f64 = (0..k).map(|i| quotient[i] * other.0[k - i]).sum();
            quotient[k] = (self.0[k] - known) / other.0[0];
        }
        Self(quotient)
    }
}
