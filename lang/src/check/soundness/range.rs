//! Where the values of an expression lie, as far as the types of its parts tell: interval arithmetic (Moore 1966).

use crate::arena::Id;
use crate::check::constant::value;
use crate::distribution::Law;
use crate::model::{
    BinaryOperator, ColumnKind, Distribution, Expression, Function, Model, Reducer, Support, UnaryOperator,
};

/// An interval, whether all its values are whole, and whether it may be too wide because what is subtracted varies.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Range {
    pub(super) low: f64,
    pub(super) high: f64,
    pub(super) whole: bool,
    pub(super) loose: bool,
}

impl Range {
    const ALL: Range = Range::new(f64::NEG_INFINITY, f64::INFINITY);

    pub(super) const fn new(low: f64, high: f64) -> Range {
        Range { low, high, whole: false, loose: false }
    }

    fn whole(self) -> Range {
        Range { whole: true, ..self }
    }

    pub(super) fn within(self, other: Range) -> bool {
        self.low >= other.low && self.high <= other.high
    }

    pub(super) fn is_point(self) -> bool {
        self.low == self.high
    }

    fn with(self, other: Range, low: f64, high: f64) -> Range {
        let bound = |x: f64, none: f64| if x.is_nan() { none } else { x };
        Range {
            low: bound(low, f64::NEG_INFINITY),
            high: bound(high, f64::INFINITY),
            whole: self.whole && other.whole,
            loose: self.loose || other.loose,
        }
    }

    /// Increasing functions.
    fn map(self, f: impl Fn(f64) -> f64) -> Range {
        Range { low: f(self.low), high: f(self.high), whole: false, ..self }
    }
}

/// The range of a type.
pub(super) fn of_support(model: &Model, support: Support) -> Range {
    let end = |bound: Option<Id<Expression>>, none: f64| bound.and_then(|b| value(model, b)).unwrap_or(none);
    match support {
        Support::Real { low, high } => Range::new(end(low, f64::NEG_INFINITY), end(high, f64::INFINITY)),
        Support::Positive => Range::new(0.0, f64::INFINITY),
        Support::Fraction => Range::new(0.0, 1.0),
        Support::Count => Range::new(0.0, f64::INFINITY).whole(),
        Support::YesNo => Range::new(0.0, 1.0).whole(),
    }
}

/// The range of a law with its truncation.
pub(super) fn of_law(model: &Model, law: &Distribution) -> Range {
    let parameter = |at: usize| of(model, law.parameters[at]);
    let range = match law.law {
        Law::Normal | Law::StudentT | Law::Laplace | Law::Cauchy => Range::ALL,
        Law::Lognormal
        | Law::Gamma
        | Law::InverseGamma
        | Law::Exponential
        | Law::Weibull
        | Law::HalfNormal
        | Law::HalfCauchy
        | Law::HalfStudentT => Range::new(0.0, f64::INFINITY),
        Law::Beta => Range::new(0.0, 1.0),
        Law::Uniform => Range::new(parameter(0).low, parameter(1).high),
        Law::Bernoulli | Law::BernoulliLogOdds | Law::BernoulliProbit => Range::new(0.0, 1.0).whole(),
        Law::Binomial | Law::BinomialLogOdds | Law::BinomialProbit => {
            Range::new(0.0, parameter(0).high).whole()
        }
        Law::Poisson | Law::PoissonLog | Law::NegativeBinomial | Law::NegativeBinomialLog => {
            Range::new(0.0, f64::INFINITY).whole()
        }
    };
    // A constant end is as good as its value, as the bounds of a type are.
    let low =
        law.low.map_or(f64::NEG_INFINITY, |end| value(model, end).unwrap_or_else(|| of(model, end).low));
    let high = law.high.map_or(f64::INFINITY, |end| value(model, end).unwrap_or_else(|| of(model, end).high));
    Range { low: range.low.max(low), high: range.high.min(high), ..range }
}

/// The range of an expression.
pub(super) fn of(model: &Model, id: Id<Expression>) -> Range {
    match &model.expressions[id] {
        Expression::Number(number) => Range { whole: number.fract() == 0.0, ..Range::new(*number, *number) },
        Expression::Given(given) => of_support(model, model.givens[*given].support),
        Expression::Unknown(unknown, _) => of_support(model, model.unknowns[*unknown].support),
        Expression::Column(column, _) => match &model.columns[*column].kind {
            ColumnKind::Values { support, between, .. } => {
                let range = of_support(model, *support);
                let ends = between.map(|(a, b)| (value(model, a), value(model, b)));
                match ends {
                    Some((Some(low), Some(high))) => {
                        Range { low: range.low.max(low), high: range.high.min(high), ..range }
                    }
                    _ => range,
                }
            }
            ColumnKind::Labels { .. } => Range::ALL,
        },
        Expression::Named(named, _) => of(model, model.named[*named].value),
        Expression::LabelTest { .. } | Expression::Unary(UnaryOperator::Not, _) => {
            Range::new(0.0, 1.0).whole()
        }
        Expression::Unary(UnaryOperator::Negate, a) => {
            let a = of(model, *a);
            a.with(a, -a.high, -a.low)
        }
        Expression::Binary(operator, a, b) => binary(*operator, of(model, *a), of(model, *b)),
        Expression::Call(function, arguments) => {
            let ranges: Vec<Range> = arguments.iter().map(|a| of(model, *a)).collect();
            call(*function, &ranges)
        }
        Expression::If(_, a, b) => {
            let (a, b) = (of(model, *a), of(model, *b));
            a.with(b, a.low.min(b.low), a.high.max(b.high))
        }
        Expression::Reduce { reducer, body, .. } => {
            let body = of(model, *body);
            match reducer {
                Reducer::Sum if body.low >= 0.0 => Range { high: f64::INFINITY, low: 0.0, ..body },
                Reducer::Sum => Range::ALL,
                Reducer::Mean => Range { whole: false, ..body },
                Reducer::Min | Reducer::Max => body,
                Reducer::Sd => Range::new(0.0, f64::INFINITY),
                Reducer::Count => Range::new(0.0, f64::INFINITY).whole(),
            }
        }
    }
}

fn binary(operator: BinaryOperator, a: Range, b: Range) -> Range {
    match operator {
        BinaryOperator::Add => a.with(b, a.low + b.low, a.high + b.high),
        BinaryOperator::Subtract => {
            let found = a.with(b, a.low - b.high, a.high - b.low);
            let bounded = |range: Range| range.low.is_finite() || range.high.is_finite();
            // Of two one-sided ranges nothing is left, though the difference may well stay on one side.
            let loose = found.loose || (bounded(a) && bounded(b) && !b.is_point());
            Range { loose, ..found }
        }
        BinaryOperator::Multiply => {
            let products = [a.low * b.low, a.low * b.high, a.high * b.low, a.high * b.high];
            // 0 times infinity is 0 here: an end at 0 is never left by a finite factor.
            let ends = products.map(|product| if product.is_nan() { 0.0 } else { product });
            a.with(
                b,
                ends.iter().copied().fold(f64::INFINITY, f64::min),
                ends.iter().copied().fold(f64::NEG_INFINITY, f64::max),
            )
        }
        BinaryOperator::Divide => {
            let found = if b.low >= 0.0 && a.low >= 0.0 {
                a.with(b, if b.high.is_finite() { a.low / b.high } else { 0.0 }, a.high / b.low)
            } else if b.low > 0.0 && b.is_point() {
                a.with(b, a.low / b.low, a.high / b.low)
            } else {
                Range { loose: a.loose || b.loose, ..Range::ALL }
            };
            Range { whole: false, ..found }
        }
        BinaryOperator::Power => {
            let even = b.is_point() && b.low.fract() == 0.0 && b.low % 2.0 == 0.0;
            if a.low >= 0.0 || even {
                let point = a.is_point() && b.is_point();
                let exact = a.low.powf(b.low);
                if point {
                    Range::new(exact, exact)
                } else {
                    Range { loose: a.loose, ..Range::new(0.0, f64::INFINITY) }
                }
            } else {
                Range { loose: a.loose || b.loose, ..Range::ALL }
            }
        }
        BinaryOperator::Equal
        | BinaryOperator::NotEqual
        | BinaryOperator::Less
        | BinaryOperator::LessOrEqual
        | BinaryOperator::Greater
        | BinaryOperator::GreaterOrEqual
        | BinaryOperator::And
        | BinaryOperator::Or => Range::new(0.0, 1.0).whole(),
    }
}

fn call(function: Function, a: &[Range]) -> Range {
    let x = a[0];
    match function {
        Function::Exp => x.map(f64::exp),
        Function::Log | Function::Log2 | Function::Log10 if x.low >= 1.0 => {
            Range { low: 0.0, ..Range::new(0.0, f64::INFINITY) }
        }
        Function::Log | Function::Log2 | Function::Log10 | Function::Logit | Function::Lgamma => {
            Range { loose: x.loose, ..Range::ALL }
        }
        Function::Sqrt => Range::new(x.low.max(0.0).sqrt(), x.high.max(0.0).sqrt()),
        Function::Abs if x.low >= 0.0 => x,
        Function::Abs => Range { whole: x.whole, ..Range::new(0.0, x.low.abs().max(x.high.abs())) },
        Function::Logistic | Function::NormalCdf => Range::new(0.0, 1.0),
        Function::Log1p => x.map(|x| if x >= -1.0 { x.ln_1p() } else { f64::NEG_INFINITY }),
        Function::Expm1 => x.map(f64::exp_m1),
        Function::Floor => Range { whole: true, ..x.map(f64::floor) },
        Function::Ceiling => Range { whole: true, ..x.map(f64::ceil) },
        Function::Round => Range { whole: true, ..x.map(f64::round) },
        Function::Sin | Function::Cos | Function::Tanh => Range::new(-1.0, 1.0),
        Function::Min => x.with(a[1], x.low.min(a[1].low), x.high.min(a[1].high)),
        Function::Max => x.with(a[1], x.low.max(a[1].low), x.high.max(a[1].high)),
    }
}
