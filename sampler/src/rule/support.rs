//! The unconstrained scale of a bounded scalar.

use stook_lang::model::{Model, Support};

use crate::numeric::special;

/// A one-to-one map from the real line to where a scalar lies.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Transform {
    /// The real line itself.
    Identity,
    /// `low + exp(z)`.
    Above(f64),
    /// `high - exp(z)`.
    Below(f64),
    /// `low + (high - low) logistic(z)`.
    Between(f64, f64),
    /// Whole numbers: the scalar is the whole part of z (Neal 2003, section 4: any density that is constant on each
    /// unit interval).
    Whole,
}

impl Transform {
    /// The transform of a support type, with its bounds worked out.
    pub fn of(model: &Model, givens: &[f64], support: Support) -> Transform {
        let number = |bound| crate::bind::constant(model, givens, bound);
        match support {
            Support::Real { low: None, high: None } => Transform::Identity,
            Support::Real { low: Some(low), high: None } => Transform::Above(number(low)),
            Support::Real { low: None, high: Some(high) } => Transform::Below(number(high)),
            Support::Real { low: Some(low), high: Some(high) } => {
                Transform::Between(number(low), number(high))
            }
            Support::Positive => Transform::Above(0.0),
            Support::Fraction => Transform::Between(0.0, 1.0),
            Support::Count | Support::YesNo => Transform::Whole,
        }
    }

    /// From the real line.
    pub fn scalar(self, z: f64) -> f64 {
        match self {
            Transform::Identity => z,
            Transform::Above(low) => low + libm::exp(z),
            Transform::Below(high) => high - libm::exp(z),
            Transform::Between(low, high) => low + (high - low) * special::logistic(z),
            Transform::Whole => z.floor(),
        }
    }

    /// To the real line; `within` in [0, 1) chooses the point of a whole number's interval.
    pub fn real(self, x: f64, within: f64) -> f64 {
        match self {
            Transform::Identity => x,
            Transform::Above(low) => libm::log(x - low),
            Transform::Below(high) => libm::log(high - x),
            Transform::Between(low, high) => special::logit((x - low) / (high - low)),
            Transform::Whole => x + within,
        }
    }

    /// The log of the derivative of [`Transform::scalar`] at z.
    pub fn ln_jacobian(self, z: f64) -> f64 {
        match self {
            Transform::Identity | Transform::Whole => 0.0,
            Transform::Above(_) | Transform::Below(_) => z,
            Transform::Between(low, high) => {
                libm::log(high - low) - special::log1p_exp(z) - special::log1p_exp(-z)
            }
        }
    }
}
