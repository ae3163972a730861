//! Arguments against their domains: `sd` above 0, `p` between 0 and 1.

use super::range::{Range, of};
use crate::check::WrittenArgument;
use crate::distribution::{Domain, Law};
use crate::model::{Expression, Model};
use crate::problem::{DistributionProblem, Problems};

/// Checks every argument that the text writes.
pub(super) fn arguments(model: &Model, arguments: &[WrittenArgument], problems: &mut Problems) {
    for (id, domain, law) in arguments {
        let span = model.expressions.span(*id);
        let found = of(model, *id);
        let (wanted, must_be) = wanted(*domain);
        let whole = *domain != Domain::Count || found.whole;
        let constant = matches!(model.expressions[*id], Expression::Number(_));
        let zero_sd = *domain == Domain::Positive && constant && found.low == 0.0;
        if found.within(wanted) && whole && !zero_sd {
            continue;
        }
        let family = family_name(model, *id);
        let outside = found.high < wanted.low || found.low > wanted.high || found.is_point();
        if outside {
            let value =
                if found.is_point() { found.low.to_string() } else { "outside its domain".to_string() };
            problems.add(DistributionProblem::Impossible { span, family, value, must_be });
        } else if found.loose && whole {
            problems.add(DistributionProblem::MightLeave { span, family, must_be });
        } else {
            let instead = instead(*domain, *law).to_string();
            problems.add(DistributionProblem::MayLeave { span, family, must_be, instead });
        }
    }
    ends(model, problems);
}

/// The ends of a uniform with constant ends must be in order.
fn ends(model: &Model, problems: &mut Problems) {
    let laws = model.unknowns.iter().map(|(_, unknown)| &unknown.prior);
    let laws = laws.chain(model.responses.iter().map(|response| &response.distribution));
    for law in laws.filter(|law| law.law == Law::Uniform && super::is_built(law)) {
        let (low, high) = (of(model, law.parameters[0]), of(model, law.parameters[1]));
        if low.is_point() && high.is_point() && low.low >= high.low {
            problems.add(DistributionProblem::Impossible {
                span: model.expressions.span(law.parameters[1]),
                family: law.name,
                value: high.low.to_string(),
                must_be: "above its lower end",
            });
        }
    }
}

fn wanted(domain: Domain) -> (Range, &'static str) {
    match domain {
        Domain::Real => (Range::new(f64::NEG_INFINITY, f64::INFINITY), "a number"),
        Domain::Positive => (Range::new(0.0, f64::INFINITY), "above 0"),
        Domain::NotNegative => (Range::new(0.0, f64::INFINITY), "0 or more"),
        Domain::Fraction => (Range::new(0.0, 1.0), "between 0 and 1"),
        Domain::Count => (Range::new(0.0, f64::INFINITY), "a whole number from 0"),
    }
}

/// The distribution that an argument stands in.
fn family_name(model: &Model, id: crate::arena::Id<Expression>) -> &'static str {
    let span = model.expressions.span(id);
    let laws = model.unknowns.iter().map(|(_, unknown)| &unknown.prior);
    let laws = laws.chain(model.responses.iter().map(|response| &response.distribution));
    let around = laws.filter(|law| law.span.start <= span.start && law.span.end >= span.end);
    around.map(|law| law.name).next().unwrap_or("this distribution")
}

fn instead(domain: Domain, law: Law) -> &'static str {
    match (domain, law) {
        (Domain::NotNegative, Law::Poisson | Law::NegativeBinomial) => {
            "write its logarithm: `log_mean:` in place of `mean:`"
        }
        (Domain::Fraction, Law::Bernoulli | Law::Binomial) => {
            "write its log-odds or its probit: `log_odds:` or `probit:` in place of `p:`"
        }
        (Domain::Fraction, _) => "put it through `logistic(...)`, or declare its parts `fraction`",
        (Domain::Count, _) => "take a column declared `count`, or a whole number",
        _ => "declare its parts `positive`, or put it through `exp(...)`",
    }
}
