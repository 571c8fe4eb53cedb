//! Short names for the arithmetic of one kind of vector register.

use pulp::Simd;

#[derive(Clone, Copy)]
pub(super) struct Lanes<S: Simd>(pub(super) S);

/// A complex number in each lane.
pub(super) type Complex<S> = [<S as Simd>::f64s; 2];

impl<S: Simd> Lanes<S> {
    #[inline(always)]
    pub(super) fn all(self, value: f64) -> S::f64s {
        self.0.splat_f64s(value)
    }
    #[inline(always)]
    pub(super) fn add(self, a: S::f64s, b: S::f64s) -> S::f64s {
        self.0.add_f64s(a, b)
    }
    #[inline(always)]
    pub(super) fn sub(self, a: S::f64s, b: S::f64s) -> S::f64s {
        self.0.sub_f64s(a, b)
    }
    #[inline(always)]
    pub(super) fn mul(self, a: S::f64s, b: S::f64s) -> S::f64s {
        self.0.mul_f64s(a, b)
    }
    /// a b + c
    #[inline(always)]
    pub(super) fn fma(self, a: S::f64s, b: S::f64s, c: S::f64s) -> S::f64s {
        self.0.mul_add_e_f64s(a, b, c)
    }
    /// a b - c
    #[inline(always)]
    pub(super) fn fms(self, a: S::f64s, b: S::f64s, c: S::f64s) -> S::f64s {
        self.0.mul_add_e_f64s(a, b, self.0.neg_f64s(c))
    }
    /// c - a b
    #[inline(always)]
    pub(super) fn fnma(self, a: S::f64s, b: S::f64s, c: S::f64s) -> S::f64s {
        self.0.negate_mul_add_e_f64s(a, b, c)
    }
    #[inline(always)]
    pub(super) fn product(self, a: Complex<S>, b: Complex<S>) -> Complex<S> {
        [self.fnma(a[1], b[1], self.mul(a[0], b[0])), self.fma(a[0], b[1], self.mul(a[1], b[0]))]
    }
}
