//! One small model for each closed form, each kind of block and each other rule.

#![allow(unreachable_pub)]

/// A case: its name, its text, and rows for each combination of labels.
pub struct Case {
    /// What it shows.
    pub name: &'static str,
    /// The rule that must be chosen for the unknown named `x`.
    pub rule: &'static str,
    /// The model.
    pub text: &'static str,
    /// Rows for each combination of labels.
    pub rows: usize,
}

/// The cases. Priors are tight enough that every moment the tests compare exists.
pub const CASES: &[Case] = &[
    Case {
        name: "normal mean, elements by label",
        rule: "conjugate",
        rows: 2,
        text: "group g\ntable t { g, y : real }\nunknown x : real per g follows normal(mean: 1, sd: 2) by conjugate\nresponse y follows normal(mean: 0.5 + 2 * x, sd: 1.5)\n",
    },
    Case {
        name: "normal mean with a half-normal prior",
        rule: "conjugate",
        rows: 2,
        text: "table t { y : real }\nunknown x : positive follows half_normal(sd: 2)\nresponse y follows normal(mean: 3 * x, sd: 1.5)\n",
    },
    Case {
        name: "normal mean with a truncated prior",
        rule: "conjugate",
        rows: 2,
        text: "table t { y : real }\nunknown x : real follows normal(mean: 0, sd: 2) between -1 and 0.5\nresponse y follows normal(mean: x, sd: 1.5)\n",
    },
    Case {
        name: "normal mean with a uniform prior",
        rule: "conjugate",
        rows: 2,
        text: "table t { y : real }\nunknown x : real follows uniform(low: -1, high: 4)\nresponse y follows normal(mean: x / 2, sd: 1.5)\n",
    },
    Case {
        name: "lognormal mean",
        rule: "conjugate",
        rows: 2,
        text: "table t { y : positive }\nunknown x : real follows normal(mean: 0, sd: 1) by conjugate\nresponse y follows lognormal(log_mean: 1 + x, log_sd: 0.5)\n",
    },
    Case {
        name: "normal precision with a gamma prior",
        rule: "conjugate",
        rows: 3,
        text: "group g\ntable t { g, y : real }\nunknown x : positive per g follows gamma(shape: 4, rate: 2)\nresponse y follows normal(mean: 1, precision: 2 * x)\n",
    },
    Case {
        name: "normal sd written as a power of a precision",
        rule: "conjugate",
        rows: 3,
        text: "table t { y : real }\nunknown x : positive follows gamma(shape: 4, rate: 2)\nresponse y follows normal(mean: 1, sd: 3 / sqrt(x))\n",
    },
    Case {
        name: "normal variance with an inverse-gamma prior",
        rule: "conjugate",
        rows: 3,
        text: "table t { y : real }\nunknown x : positive follows inverse_gamma(shape: 6, scale: 4)\nresponse y follows normal(mean: 1, variance: 2 * x)\n",
    },
    Case {
        name: "lognormal precision with a gamma prior",
        rule: "conjugate",
        rows: 3,
        text: "table t { y : positive }\nunknown x : positive follows gamma(shape: 4, rate: 2)\nresponse y follows lognormal(log_mean: 0.3, log_sd: x ^ -0.5)\n",
    },
    Case {
        name: "half-normal sd with an inverse-gamma prior on its square",
        rule: "conjugate",
        rows: 3,
        text: "table t { y : positive }\nunknown x : positive follows inverse_gamma(shape: 6, scale: 4)\nresponse y follows half_normal(sd: sqrt(x))\n",
    },
    Case {
        name: "laplace scale with an inverse-gamma prior",
        rule: "conjugate",
        rows: 3,
        text: "table t { y : real }\nunknown x : positive follows inverse_gamma(shape: 6, scale: 4)\nresponse y follows laplace(centre: 1, scale: 2 * x)\n",
    },
    Case {
        name: "poisson mean with a gamma prior and exposure",
        rule: "conjugate",
        rows: 3,
        text: "group g\ntable t { g, y : count }\nunknown x : positive per g follows gamma(shape: 4, rate: 2)\nresponse y follows poisson(mean: 1.5 * x, exposure: 2)\n",
    },
    Case {
        name: "exponential rate with a gamma prior",
        rule: "conjugate",
        rows: 3,
        text: "table t { y : positive }\nunknown x : positive follows gamma(shape: 4, rate: 2)\nresponse y follows exponential(rate: 2 * x)\n",
    },
    Case {
        name: "exponential rate with an exponential prior",
        rule: "conjugate",
        rows: 3,
        text: "table t { y : positive }\nunknown x : positive follows exponential(mean: 2)\nresponse y follows exponential(rate: x)\n",
    },
    Case {
        name: "exponential mean with an inverse-gamma prior",
        rule: "conjugate",
        rows: 3,
        text: "table t { y : positive }\nunknown x : positive follows inverse_gamma(shape: 8, scale: 6)\nresponse y follows exponential(mean: 3 * x)\n",
    },
    Case {
        name: "gamma rate with a gamma prior",
        rule: "conjugate",
        rows: 3,
        text: "table t { y : positive }\nunknown x : positive follows gamma(shape: 6, rate: 2)\nresponse y follows gamma(shape: 3, rate: 2 * x)\n",
    },
    Case {
        name: "gamma scale with an inverse-gamma prior",
        rule: "conjugate",
        rows: 3,
        text: "table t { y : positive }\nunknown x : positive follows inverse_gamma(shape: 8, scale: 6)\nresponse y follows gamma(shape: 3, scale: x)\n",
    },
    Case {
        name: "inverse-gamma scale with a gamma prior",
        rule: "conjugate",
        rows: 3,
        text: "table t { y : positive }\nunknown x : positive follows gamma(shape: 6, rate: 2)\nresponse y follows inverse_gamma(shape: 6, scale: 2 * x)\n",
    },
    Case {
        name: "weibull scale with an inverse-gamma prior on its power",
        rule: "conjugate",
        rows: 3,
        text: "table t { y : positive }\nunknown x : positive follows inverse_gamma(shape: 8, scale: 6)\nresponse y follows weibull(shape: 2, scale: 1.5 * x ^ 0.5)\n",
    },
    Case {
        name: "bernoulli probability with a beta prior",
        rule: "conjugate",
        rows: 3,
        text: "table t { y : yesno }\nunknown x : fraction follows beta(a: 2, b: 3)\nresponse y follows bernoulli(p: x)\n",
    },
    Case {
        name: "binomial probability with a beta prior, as x and as 1 - x",
        rule: "conjugate",
        rows: 2,
        text: "table t { y : count, z : count }\nunknown x : fraction follows beta(mean: 0.4, size: 5)\nresponse y follows binomial(trials: 7, p: x)\nresponse z follows binomial(trials: 5, p: 1 - x)\n",
    },
    Case {
        name: "binomial probability with a uniform prior",
        rule: "conjugate",
        rows: 2,
        text: "table t { y : count }\nunknown x : fraction follows uniform(low: 0.1, high: 0.8)\nresponse y follows binomial(trials: 7, p: x)\n",
    },
    Case {
        name: "crossed and nested effects beside an intercept",
        rule: "joint",
        rows: 1,
        text: "group a\ngroup b\ngroup c within b\ntable t { a, b, c, y : real }\nunknown x : real follows normal(mean: 1, sd: 2)\nunknown ea : real per a follows normal(mean: 0, sd: 1)\nunknown eb : real per b follows normal(mean: x, sd: 0.7)\nunknown ec : real per c follows normal(mean: 0, sd: 0.5)\nunknown tau : positive follows gamma(shape: 5, rate: 3)\nresponse y follows normal(mean: 2 * ea - eb + ec, precision: tau)\n",
    },
    Case {
        name: "the same over enough rows to be summed once",
        rule: "joint",
        rows: 4,
        text: "group a\ngroup b\ngroup c within b\ntable t { a, b, c, y : real }\nunknown x : real follows normal(mean: 1, sd: 2)\nunknown ea : real per a follows normal(mean: 0, sd: 1)\nunknown eb : real per b follows normal(mean: x, sd: 0.7)\nunknown ec : real per c follows normal(mean: 0, sd: 0.5)\nunknown tau : positive follows gamma(shape: 5, rate: 3)\nresponse y follows normal(mean: 2 * ea - eb + ec, precision: tau)\n",
    },
    Case {
        name: "a block whose coefficients are unknown outside it",
        rule: "joint",
        rows: 2,
        text: "group g\ntable t { g, y : real, z : positive }\nunknown k : real follows normal(mean: 1, sd: 0.5)\nunknown x : real per g follows normal(mean: 0, sd: 1)\nunknown w : real follows normal(mean: 0, sd: 1)\nunknown s : positive follows half_normal(sd: 1)\nresponse y follows normal(mean: x + w, sd: 0.5 + s)\nresponse z follows lognormal(log_mean: x * exp(k) - w, log_sd: 0.8)\n",
    },
    Case {
        name: "scale of effects and residual, by slice in closed form",
        rule: "slice",
        rows: 2,
        text: "group g\ntable t { g, y : real }\nunknown x : positive follows half_normal(sd: 1)\nunknown e : real per g follows normal(mean: 0, sd: x)\nresponse y follows normal(mean: e, sd: 1 + 0 * x)\n",
    },
    Case {
        name: "the same over enough rows to be summed once, with an intercept",
        rule: "slice",
        rows: 30,
        text: "group g\ntable t { g, y : real }\nunknown x : positive follows half_normal(sd: 1)\nunknown m : real follows normal(mean: 0, sd: 1)\nunknown r : positive follows half_normal(sd: 1)\nunknown e : real per g follows normal(mean: 0, sd: x)\nresponse y follows normal(mean: m + e, sd: r)\n",
    },
    Case {
        name: "a scale in two powers, by slice in closed form",
        rule: "slice",
        rows: 3,
        text: "table t { y : real, z : positive }\nunknown x : positive follows lognormal(log_mean: 0, log_sd: 0.4)\nresponse y follows normal(mean: 0, sd: x)\nresponse z follows exponential(rate: 2 * x)\n",
    },
    Case {
        name: "poisson log mean, by slice",
        rule: "slice",
        rows: 2,
        text: "group g\ntable t { g, y : count }\nunknown x : real per g follows normal(mean: 0, sd: 0.7)\nresponse y follows poisson(log_mean: 0.5 + x)\n",
    },
    Case {
        name: "student-t centre, by slice",
        rule: "slice",
        rows: 2,
        text: "table t { y : real }\nunknown x : real follows student_t(df: 8, centre: 0, scale: 1)\nresponse y follows student_t(df: 5, centre: x, scale: 1)\n",
    },
    Case {
        name: "bounded unknowns, by slice",
        rule: "slice",
        rows: 2,
        text: "table t { y : fraction }\nunknown x : real between 1 and 3 follows uniform(low: 1, high: 3)\nresponse y follows beta(a: x, b: 2)\n",
    },
    Case {
        name: "a truncated response, by slice",
        rule: "slice",
        rows: 2,
        text: "table t { y : real }\nunknown x : real follows normal(mean: 0, sd: 1)\nresponse y follows normal(mean: x, sd: 1) above 0\n",
    },
    Case {
        name: "a yes or no unknown, by enumeration",
        rule: "enumerate",
        rows: 2,
        text: "group g\ntable t { g, y : real }\nunknown x : yesno per g follows bernoulli(p: 0.4)\nresponse y follows normal(mean: if x then 1 else -0.5, sd: 1)\n",
    },
    Case {
        name: "a binomial unknown, by enumeration",
        rule: "enumerate",
        rows: 2,
        text: "table t { y : real }\nunknown x : count follows binomial(trials: 6, p: 0.4)\nresponse y follows normal(mean: x, sd: 2)\n",
    },
    Case {
        name: "a count without an upper end, by slice",
        rule: "slice",
        rows: 2,
        text: "table t { y : real }\nunknown x : count follows poisson(mean: 4)\nresponse y follows normal(mean: x, sd: 2)\n",
    },
    Case {
        name: "a reduction over labels",
        rule: "slice",
        rows: 2,
        text: "group g\ntable t { g, y : real }\nunknown x : real per g follows normal(mean: 0, sd: 1)\nresponse y follows normal(mean: x - mean(x over g) + 0.1 * max(x over g), sd: 1)\n",
    },
];
