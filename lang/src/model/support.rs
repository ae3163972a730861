//! Support types: where a quantity's values lie.

use super::Expression;
use crate::arena::Id;

/// Where a scalar lies. Bounds are expressions of numbers and givens only.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Support {
    /// The real line, or the part of it between the bounds.
    Real {
        /// Lower bound.
        low: Option<Id<Expression>>,
        /// Upper bound.
        high: Option<Id<Expression>>,
    },
    /// Above 0.
    Positive,
    /// Between 0 and 1.
    Fraction,
    /// 0, 1, 2, ...
    Count,
    /// 0 or 1.
    YesNo,
}

impl Support {
    /// The whole real line.
    pub const REAL: Support = Support::Real { low: None, high: None };

    /// Whether the values are whole numbers.
    pub fn is_discrete(self) -> bool {
        match self {
            Support::Count | Support::YesNo => true,
            Support::Real { .. } | Support::Positive | Support::Fraction => false,
        }
    }

    /// The words of the notation, without bounds.
    pub fn words(self) -> &'static str {
        match self {
            Support::Real { low: None, high: None } => "real",
            Support::Real { low: Some(_), high: None } => "real above",
            Support::Real { low: None, high: Some(_) } => "real below",
            Support::Real { low: Some(_), high: Some(_) } => "real between",
            Support::Positive => "positive",
            Support::Fraction => "fraction",
            Support::Count => "count",
            Support::YesNo => "yesno",
        }
    }
}
