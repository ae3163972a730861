//! The scalar functions of the notation.

/// A function of one or two scalars.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Function {
    /// e to the x.
    Exp,
    /// Natural logarithm.
    Log,
    /// Logarithm to base 2.
    Log2,
    /// Logarithm to base 10.
    Log10,
    /// Square root.
    Sqrt,
    /// Absolute value.
    Abs,
    /// 1 / (1 + exp(-x)).
    Logistic,
    /// log(x / (1 - x)).
    Logit,
    /// log(1 + x).
    Log1p,
    /// exp(x) - 1.
    Expm1,
    /// log of the gamma function.
    Lgamma,
    /// Largest whole number not above x.
    Floor,
    /// Smallest whole number not below x.
    Ceiling,
    /// Nearest whole number, halves away from zero.
    Round,
    /// Sine of x in radians.
    Sin,
    /// Cosine of x in radians.
    Cos,
    /// Hyperbolic tangent.
    Tanh,
    /// Standard normal distribution function.
    NormalCdf,
    /// The smaller of two.
    Min,
    /// The larger of two.
    Max,
}

impl Function {
    /// Every function.
    pub const ALL: [Function; 20] = [
        Function::Exp,
        Function::Log,
        Function::Log2,
        Function::Log10,
        Function::Sqrt,
        Function::Abs,
        Function::Logistic,
        Function::Logit,
        Function::Log1p,
        Function::Expm1,
        Function::Lgamma,
        Function::Floor,
        Function::Ceiling,
        Function::Round,
        Function::Sin,
        Function::Cos,
        Function::Tanh,
        Function::NormalCdf,
        Function::Min,
        Function::Max,
    ];

    /// The name in the notation.
    pub fn name(self) -> &'static str {
        match self {
            Function::Exp => "exp",
            Function::Log => "log",
            Function::Log2 => "log2",
            Function::Log10 => "log10",
            Function::Sqrt => "sqrt",
            Function::Abs => "abs",
            Function::Logistic => "logistic",
            Function::Logit => "logit",
            Function::Log1p => "log1p",
            Function::Expm1 => "expm1",
            Function::Lgamma => "lgamma",
            Function::Floor => "floor",
            Function::Ceiling => "ceiling",
            Function::Round => "round",
            Function::Sin => "sin",
            Function::Cos => "cos",
            Function::Tanh => "tanh",
            Function::NormalCdf => "normal_cdf",
            Function::Min => "min",
            Function::Max => "max",
        }
    }

    /// How many arguments it takes.
    pub fn arity(self) -> usize {
        match self {
            Function::Min | Function::Max => 2,
            _ => 1,
        }
    }
}
