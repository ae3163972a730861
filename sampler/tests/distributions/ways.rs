//! Every way in which the language writes a distribution, from its text to a density, against statrs 0.19.
//!
//! statrs agrees to 1e-9 here, not to the 1e-11 of our own densities: its own log gamma has an error of about 1e-14 times
//! the size of what it is given. Where statrs lacks a law it is made from one that it has, as each line shows.

use statrs::distribution::{
    Beta, Binomial, Cauchy, Exp, Gamma, InverseGamma, Laplace, LogNormal, NegativeBinomial, Normal, Poisson,
    StudentsT, Uniform, Weibull,
};
use statrs::distribution::{Continuous, Discrete};
use statrs::function::erf::erfc;
use stook_lang::check::check_text;
use stook_lang::distribution::{ALL, Law};
use stook_sampler::bind::constant;
use stook_sampler::distribution::ln_density;

const TOLERANCE: f64 = 1e-9;

/// The law and its canonical parameters behind a response of numbers alone.
fn lowered(kind: &str, written: &str) -> (Law, Vec<f64>) {
    let text = format!(
        "table t {{ y : {kind}, z : real }}\nunknown m : real follows normal(mean: 0, sd: 1)\nresponse z follows normal(mean: m, sd: 1)\nresponse y follows {written}\n"
    );
    let (model, problems) = check_text(&text);
    let Some(model) = model else { panic!("{written}: {:#?}", problems.reports()) };
    let found = model.responses.iter().find(|response| model.columns[response.column].name == "y").unwrap();
    let p = found.distribution.parameters.iter().map(|id| constant(&model, &[], *id)).collect();
    (found.distribution.law, p)
}

/// A kind of column, a text and the log density that statrs gives it.
type Way = (&'static str, &'static str, Box<dyn Fn(f64) -> f64>);

fn continuous(kind: &'static str, text: &'static str, law: impl Continuous<f64, f64> + 'static) -> Way {
    (kind, text, Box::new(move |x| law.ln_pdf(x)))
}

fn folded(text: &'static str, law: impl Continuous<f64, f64> + 'static) -> Way {
    ("positive", text, Box::new(move |x| law.ln_pdf(x) + 2_f64.ln()))
}

fn discrete(kind: &'static str, text: &'static str, law: impl Discrete<u64, f64> + 'static) -> Way {
    (kind, text, Box::new(move |x| law.ln_pmf(x as u64)))
}

fn logistic(x: f64) -> f64 {
    1.0 / (1.0 + (-x).exp())
}

fn phi(z: f64) -> f64 {
    0.5 * erfc(-z / 2_f64.sqrt())
}

/// By its probability of failure per trial: size / (size + mean).
fn negative_binomial(mean: f64, size: f64) -> NegativeBinomial {
    NegativeBinomial::new(size, size / (size + mean)).unwrap()
}

fn ways() -> Vec<Way> {
    let gamma = |shape, rate| Gamma::new(shape, rate).unwrap();
    vec![
        continuous("real", "normal(mean: 1.5, sd: 0.7)", Normal::new(1.5, 0.7).unwrap()),
        continuous("real", "normal(mean: 1.5, variance: 0.49)", Normal::new(1.5, 0.7).unwrap()),
        continuous("real", "normal(mean: 1.5, precision: 4)", Normal::new(1.5, 0.5).unwrap()),
        continuous("real", "student_t(df: 3.5, centre: 1, scale: 2)", StudentsT::new(1.0, 2.0, 3.5).unwrap()),
        continuous("real", "laplace(centre: 1, scale: 2)", Laplace::new(1.0, 2.0).unwrap()),
        continuous("real", "cauchy(centre: 1, scale: 2)", Cauchy::new(1.0, 2.0).unwrap()),
        continuous("positive", "lognormal(median: 2, log_sd: 0.6)", LogNormal::new(2_f64.ln(), 0.6).unwrap()),
        continuous("positive", "lognormal(log_mean: 0.3, log_sd: 0.6)", LogNormal::new(0.3, 0.6).unwrap()),
        continuous("positive", "gamma(shape: 2.5, rate: 1.2)", gamma(2.5, 1.2)),
        continuous("positive", "gamma(shape: 2.5, scale: 0.8)", gamma(2.5, 1.25)),
        continuous("positive", "gamma(mean: 3, sd: 1.5)", gamma(4.0, 4.0 / 3.0)),
        continuous("positive", "inverse_gamma(shape: 3, scale: 2)", InverseGamma::new(3.0, 2.0).unwrap()),
        continuous("positive", "exponential(rate: 1.7)", Exp::new(1.7).unwrap()),
        continuous("positive", "exponential(mean: 4)", Exp::new(0.25).unwrap()),
        continuous("positive", "weibull(shape: 1.8, scale: 2.2)", Weibull::new(1.8, 2.2).unwrap()),
        continuous("fraction", "beta(a: 2.5, b: 0.7)", Beta::new(2.5, 0.7).unwrap()),
        continuous("fraction", "beta(mean: 0.3, size: 5)", Beta::new(1.5, 3.5).unwrap()),
        continuous("real", "uniform(low: -1, high: 6)", Uniform::new(-1.0, 6.0).unwrap()),
        folded("half_normal(sd: 1.4)", Normal::new(0.0, 1.4).unwrap()),
        folded("half_cauchy(scale: 1.4)", Cauchy::new(0.0, 1.4).unwrap()),
        folded("half_student_t(df: 4, scale: 1.4)", StudentsT::new(0.0, 1.4, 4.0).unwrap()),
        discrete("yesno", "bernoulli(p: 0.3)", Binomial::new(0.3, 1).unwrap()),
        discrete("yesno", "bernoulli(log_odds: -0.8)", Binomial::new(logistic(-0.8), 1).unwrap()),
        discrete("yesno", "bernoulli(probit: 0.4)", Binomial::new(phi(0.4), 1).unwrap()),
        discrete("count", "binomial(trials: 9, p: 0.3)", Binomial::new(0.3, 9).unwrap()),
        discrete("count", "binomial(trials: 9, log_odds: -0.8)", Binomial::new(logistic(-0.8), 9).unwrap()),
        discrete("count", "binomial(trials: 9, probit: 0.4)", Binomial::new(phi(0.4), 9).unwrap()),
        discrete("count", "poisson(mean: 2.4)", Poisson::new(2.4).unwrap()),
        discrete("count", "poisson(mean: 2.4, exposure: 3)", Poisson::new(7.2).unwrap()),
        discrete("count", "poisson(log_mean: 0.9)", Poisson::new(0.9_f64.exp()).unwrap()),
        discrete("count", "poisson(log_mean: 0.9, exposure: 3)", Poisson::new(3.0 * 0.9_f64.exp()).unwrap()),
        discrete("count", "negative_binomial(mean: 3, size: 2)", negative_binomial(3.0, 2.0)),
        discrete("count", "negative_binomial(mean: 3, size: 2, exposure: 0.5)", negative_binomial(1.5, 2.0)),
        discrete("count", "negative_binomial(log_mean: 0.9, size: 2)", negative_binomial(0.9_f64.exp(), 2.0)),
        discrete(
            "count",
            "negative_binomial(log_mean: 0.9, size: 2, exposure: 3)",
            negative_binomial(3.0 * 0.9_f64.exp(), 2.0),
        ),
    ]
}

fn grid(kind: &str) -> &'static [f64] {
    match kind {
        "real" => &[-0.9, -0.1, 0.5, 1.0, 2.7, 5.5],
        "positive" => &[0.01, 0.5, 1.0, 2.7, 9.0],
        "fraction" => &[0.01, 0.3, 0.5, 0.95],
        "yesno" => &[0.0, 1.0],
        _ => &[0.0, 1.0, 3.0, 9.0],
    }
}

#[test]
fn every_way_to_write_a_distribution_has_the_density_of_statrs() {
    let mut off = crate::Off::default();
    for (kind, text, wanted) in ways() {
        let (law, p) = lowered(kind, text);
        for x in grid(kind) {
            off.near(|| format!("{text} at {x}"), ln_density(law, *x, &p), wanted(*x), TOLERANCE, TOLERANCE);
        }
    }
    off.none();
}

#[test]
fn no_way_is_left_out() {
    let ways = ways();
    for family in ALL {
        for form in family.forms {
            let is_shown = ways.iter().any(|(_, text, _)| {
                text.starts_with(&format!("{}(", family.name))
                    && form.arguments.iter().filter(|argument| argument.default.is_none()).all(|argument| {
                        text.contains(&format!("({}: ", argument.name))
                            || text.contains(&format!(" {}: ", argument.name))
                    })
            });
            assert!(is_shown, "{}", form.written(family.name));
        }
    }
}
