//! Operators and functions on single numbers: the meaning that every other form of evaluation must keep to.

use stook_lang::model::{BinaryOperator, Function, UnaryOperator};

use crate::numeric::special;

fn truth(holds: bool) -> f64 {
    if holds { 1.0 } else { 0.0 }
}

/// An operator before a number.
pub(crate) fn unary(operator: UnaryOperator, a: f64) -> f64 {
    match operator {
        UnaryOperator::Negate => -a,
        UnaryOperator::Not => truth(a == 0.0),
    }
}

/// An operator between two numbers.
#[inline(always)]
pub(crate) fn binary(operator: BinaryOperator, a: f64, b: f64) -> f64 {
    match operator {
        BinaryOperator::Add => a + b,
        BinaryOperator::Subtract => a - b,
        BinaryOperator::Multiply => a * b,
        BinaryOperator::Divide => a / b,
        BinaryOperator::Power => power(a, b),
        BinaryOperator::Equal => truth(a == b),
        BinaryOperator::NotEqual => truth(a != b),
        BinaryOperator::Less => truth(a < b),
        BinaryOperator::LessOrEqual => truth(a <= b),
        BinaryOperator::Greater => truth(a > b),
        BinaryOperator::GreaterOrEqual => truth(a >= b),
        BinaryOperator::And => truth(a != 0.0 && b != 0.0),
        BinaryOperator::Or => truth(a != 0.0 || b != 0.0),
    }
}

/// `a ^ b`; the common powers exactly, without a logarithm.
#[inline]
pub(crate) fn power(a: f64, b: f64) -> f64 {
    if b == 2.0 {
        a * a
    } else if b == 0.5 {
        a.sqrt()
    } else if b == -0.5 {
        1.0 / a.sqrt()
    } else if b == -1.0 {
        1.0 / a
    } else if b == -2.0 {
        1.0 / (a * a)
    } else {
        libm::pow(a, b)
    }
}

/// A function; `a` holds as many arguments as it takes.
#[inline(always)]
pub(crate) fn call(function: Function, a: &[f64]) -> f64 {
    match function {
        Function::Exp => libm::exp(a[0]),
        Function::Log => libm::log(a[0]),
        Function::Log2 => libm::log2(a[0]),
        Function::Log10 => libm::log10(a[0]),
        Function::Sqrt => a[0].sqrt(),
        Function::Abs => a[0].abs(),
        Function::Logistic => special::logistic(a[0]),
        Function::Logit => special::logit(a[0]),
        Function::Log1p => libm::log1p(a[0]),
        Function::Expm1 => libm::expm1(a[0]),
        Function::Lgamma => special::ln_gamma(a[0]),
        Function::Floor => a[0].floor(),
        Function::Ceiling => a[0].ceil(),
        Function::Round => a[0].round(),
        Function::Sin => libm::sin(a[0]),
        Function::Cos => libm::cos(a[0]),
        Function::Tanh => libm::tanh(a[0]),
        Function::NormalCdf => special::normal_cdf(a[0]),
        Function::Min => a[0].min(a[1]),
        Function::Max => a[0].max(a[1]),
    }
}
