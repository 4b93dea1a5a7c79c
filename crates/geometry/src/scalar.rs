//! What coordinates are stored as.

use nalgebra::RealField;

/// A coordinate as it is stored: `f32` or `f64`. All arithmetic is done in `f64`.
pub trait Scalar: RealField + Copy + sealed::Sealed {
    /// The same number in the precision of arithmetic, exactly.
    #[must_use]
    fn widen(self) -> f64;

    /// The nearest number that can be stored.
    #[must_use]
    fn narrow(value: f64) -> Self;
}

mod sealed {
    #[expect(unnameable_types, reason = "what cannot be named cannot be implemented elsewhere")]
    pub trait Sealed {}
    impl Sealed for f32 {}
    impl Sealed for f64 {}
}

impl Scalar for f32 {
    #[inline(always)]
    fn widen(self) -> f64 {
        f64::from(self)
    }

    #[inline(always)]
    fn narrow(value: f64) -> Self {
        value as f32
    }
}

impl Scalar for f64 {
    #[inline(always)]
    fn widen(self) -> f64 {
        self
    }

    #[inline(always)]
    fn narrow(value: f64) -> Self {
        value
    }
}
