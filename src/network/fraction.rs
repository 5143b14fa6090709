//! Exact fractions: path degeneracies are sums of 1/n, and floats would not add up to 1.

use std::fmt;
use std::ops::Add;

/// A non-negative fraction in lowest terms.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub struct Fraction {
    numerator: u32,
    denominator: u32,
}

impl Fraction {
    /// Nothing.
    pub const ZERO: Fraction = Fraction { numerator: 0, denominator: 1 };

    /// `numerator / denominator`.
    ///
    /// # Panics
    /// If the denominator is zero.
    pub fn new(numerator: u32, denominator: u32) -> Fraction {
        assert!(denominator > 0, "a fraction of something");
        Fraction::lowest(u64::from(numerator), u64::from(denominator))
    }

    /// As a double.
    pub fn value(self) -> f64 {
        f64::from(self.numerator) / f64::from(self.denominator)
    }

    /// Numerator and denominator in lowest terms.
    pub fn parts(self) -> (u32, u32) {
        (self.numerator, self.denominator)
    }

    /// Lowest terms; matches and outcomes are counted in tens, so both fit.
    fn lowest(numerator: u64, denominator: u64) -> Fraction {
        let (mut a, mut b) = (numerator, denominator);
        while b > 0 {
            (a, b) = (b, a % b);
        }
        let divisor = a.max(1);
        Fraction { numerator: (numerator / divisor) as u32, denominator: (denominator / divisor) as u32 }
    }
}

impl Add for Fraction {
    type Output = Fraction;

    fn add(self, other: Fraction) -> Fraction {
        let [a, b, c, d] =
            [self.numerator, self.denominator, other.numerator, other.denominator].map(u64::from);
        Fraction::lowest(a * d + c * b, b * d)
    }
}

impl fmt::Display for Fraction {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        if self.denominator == 1 { write!(f, "{}", self.numerator) } else { write!(f, "{}/{}", self.numerator, self.denominator) }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn thirds_and_sixths_make_a_half() {
        assert_eq!(Fraction::new(1, 3) + Fraction::new(1, 6), Fraction::new(1, 2));
        assert_eq!(Fraction::new(4, 2).to_string(), "2");
        assert_eq!(Fraction::ZERO + Fraction::new(3, 4), Fraction::new(3, 4));
    }
}
