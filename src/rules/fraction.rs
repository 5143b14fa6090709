//! Exact fractions for path degeneracies, which are sums of parts 1/n.

use std::fmt;

/// A fraction of positive whole numbers, in lowest terms.
///
/// # Example
/// ```
/// use haloshed::rules::fraction::Fraction;
///
/// let half = Fraction::new(1, 2);
/// assert_eq!(half.plus(half), Fraction::new(3, 3));
/// assert_eq!(Fraction::new(6, 4).to_string(), "3/2");
/// ```
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub struct Fraction {
    numerator: u64,
    denominator: u64,
}

impl Fraction {
    /// `numerator / denominator` in lowest terms.
    ///
    /// # Panics
    /// If the denominator is zero.
    pub fn new(numerator: u64, denominator: u64) -> Fraction {
        assert!(denominator > 0, "a denominator is positive");
        let divisor = greatest_common_divisor(numerator, denominator);
        Fraction { numerator: numerator / divisor, denominator: denominator / divisor }
    }

    /// The part above the line.
    pub fn numerator(self) -> u64 {
        self.numerator
    }

    /// The part below the line.
    pub fn denominator(self) -> u64 {
        self.denominator
    }

    /// The sum of two fractions.
    #[must_use]
    pub fn plus(self, other: Fraction) -> Fraction {
        let divisor = greatest_common_divisor(self.denominator, other.denominator);
        let (by, other_by) = (other.denominator / divisor, self.denominator / divisor);
        Fraction::new(self.numerator * by + other.numerator * other_by, self.denominator * by)
    }

    /// The nearest floating-point number.
    pub fn to_f64(self) -> f64 {
        self.numerator as f64 / self.denominator as f64
    }
}

fn greatest_common_divisor(a: u64, b: u64) -> u64 {
    if b == 0 { a.max(1) } else { greatest_common_divisor(b, a % b) }
}

impl fmt::Display for Fraction {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self.denominator {
            1 => write!(f, "{}", self.numerator),
            below => write!(f, "{}/{below}", self.numerator),
        }
    }
}
