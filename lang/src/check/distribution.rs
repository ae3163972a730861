//! What stands behind `follows`: a distribution in canonical parameters, with its truncation.

use crate::arena::Id;
use crate::distribution::{self, Choice, Family, Lower, Refused, choose};
use crate::model::{Distribution, Expression};
use crate::problem::{DistributionProblem, Feature, ShapeProblem, Wanted};
use crate::span::Span;
use crate::syntax::tree::{self, Argument, DistributionSyntax, ExpressionKind, ModifierKind, Name};

use super::checker::{Checker, Entity, Scope};
use super::names::{function, reducer};

/// The ends of a truncation: each an expression, where there is one.
type Ends = (Option<Id<Expression>>, Option<Id<Expression>>);

impl<'t> Checker<'t> {
    /// Works out a distribution at a place; `owner` is the name that follows it.
    pub(super) fn distribution(
        &mut self,
        written: &'t DistributionSyntax,
        owner: &str,
        scope: &mut Scope,
    ) -> Option<Distribution> {
        let tree = self.tree;
        let call = &tree.expressions[written.call];
        let body = match &call.kind {
            ExpressionKind::Call { name, arguments } => self.law(name, arguments, call.span, owner, scope),
            _ => {
                self.problems
                    .add(ShapeProblem::NotADistribution { span: call.span, declared: owner.to_string() });
                None
            }
        };
        let ends = self.truncation(written, scope);
        let ((family, choice, parameters), (low, high)) = body.zip(ends)?;
        Some(Distribution {
            law: choice.form.law,
            name: family.name,
            parameters,
            low,
            high,
            span: written.span,
        })
    }

    #[allow(clippy::type_complexity, reason = "the three parts of a law, taken apart at once")]
    fn law(
        &mut self,
        name: &'t Name,
        arguments: &'t [Argument],
        span: Span,
        owner: &str,
        scope: &mut Scope,
    ) -> Option<(&'static Family, Choice, Vec<Id<Expression>>)> {
        let family = self.family(name, owner);
        // The arguments are worked out even where the distribution is unknown: each may have a mistake of its own.
        let values: Vec<Option<Id<Expression>>> = arguments
            .iter()
            .map(|argument| match argument {
                Argument::Named(_, value) | Argument::Positional(value) => self.expression(*value, scope),
                Argument::Group(_) => None,
            })
            .collect();
        let family = family?;
        if let Some(group) = arguments.iter().find_map(group_argument) {
            self.problems.add(ShapeProblem::ArgumentPer { span: group.span, name: family.name.to_string() });
            return None;
        }
        let named: Vec<(Option<&str>, Span)> =
            arguments.iter().map(|argument| self.argument(argument)).collect();
        let choice = match choose(family, &named) {
            Ok(choice) => choice,
            Err(refused) => {
                for refusal in refused {
                    self.problems.add(refused_problem(family, &refusal, &named, span));
                }
                return None;
            }
        };
        let parameters = self.parameters(&choice, &values, span)?;
        Some((family, choice, parameters))
    }

    fn parameters(
        &mut self,
        choice: &Choice,
        values: &[Option<Id<Expression>>],
        span: Span,
    ) -> Option<Vec<Id<Expression>>> {
        let mut built = Vec::with_capacity(choice.written.len());
        for (argument, written) in choice.form.arguments.iter().zip(&choice.written) {
            built.push(match written {
                Some(at) => values[*at]?,
                None => self.model.expressions.add(Expression::Number(argument.default.unwrap_or(1.0)), span),
            });
        }
        for (argument, value) in choice.form.arguments.iter().zip(&built) {
            self.written_arguments.push((*value, argument.domain, choice.form.law));
        }
        let mut lower = Lower { expressions: &mut self.model.expressions, span };
        Some((choice.form.lower)(&mut lower, &built))
    }

    /// The distribution of a name; anything else is reported.
    fn family(&mut self, name: &Name, owner: &str) -> Option<&'static Family> {
        let text = name.text.as_str();
        if let Some(family) = distribution::named(text) {
            return Some(family);
        }
        if ["mixture", "zero_inflated", "hurdle"].contains(&text) {
            self.refuse(Feature::Mixture, name.span);
        } else if distribution::is_later(text) {
            self.refuse(Feature::MatrixDistribution, name.span);
        } else if function(text).is_some() || reducer(text).is_some() {
            self.problems
                .add(ShapeProblem::NotADistribution { span: name.span, declared: owner.to_string() });
        } else {
            match self.entity(text).map(|declared| declared.entity) {
                Some(Entity::Part | Entity::Broken) => {}
                Some(_) => self.report_name(name, Wanted::Distribution),
                None => self.report_unknown(name, Wanted::Distribution),
            }
        }
        None
    }

    /// An argument's name and place.
    fn argument<'a>(&self, argument: &'a Argument) -> (Option<&'a str>, Span) {
        match argument {
            Argument::Named(name, value) => {
                (Some(&name.text), name.span.to(self.tree.expressions[*value].span))
            }
            Argument::Positional(value) => (None, self.tree.expressions[*value].span),
            Argument::Group(name) => (None, name.span),
        }
    }

    /// The ends of the truncation; the outer `None` where a mistake has been reported.
    fn truncation(&mut self, written: &DistributionSyntax, scope: &mut Scope) -> Option<Ends> {
        let (mut low, mut high): (Option<End>, Option<End>) = (None, None);
        let mut whole = true;
        for modifier in &written.modifiers {
            let (new_low, new_high) = match modifier.kind {
                ModifierKind::Between(a, b) => (Some(a), Some(b)),
                ModifierKind::Above(a) => (Some(a), None),
                ModifierKind::Below(b) => (None, Some(b)),
                ModifierKind::CensoredBelow(..)
                | ModifierKind::CensoredAbove(..)
                | ModifierKind::KnownBetween(..) => {
                    self.refuse(Feature::Censoring, modifier.span);
                    whole = false;
                    continue;
                }
            };
            for (new, end, words) in [(new_low, &mut low, "lower"), (new_high, &mut high, "upper")] {
                whole &= self.end(new, end, words, modifier.span, scope);
            }
        }
        let (low, high) = (low.map(|end| end.value), high.map(|end| end.value));
        whole &= self.ends_in_order(low, high);
        whole.then_some((low, high))
    }

    /// Ends that are constant must be in order.
    fn ends_in_order(&mut self, low: Option<Id<Expression>>, high: Option<Id<Expression>>) -> bool {
        let Some((low, high)) = low.zip(high) else { return true };
        let Some((low_value, high_value)) = self.constant_value(low).zip(self.constant_value(high)) else {
            return true;
        };
        if low_value < high_value || low_value.is_nan() || high_value.is_nan() {
            return true;
        }
        let [low, high] = [low, high].map(|end| self.model.expressions.span(end));
        self.problems.add(crate::problem::StructureProblem::BoundsReversed {
            low,
            high,
            low_value,
            high_value,
        });
        false
    }

    fn end(
        &mut self,
        new: Option<Id<tree::Expression>>,
        end: &mut Option<End>,
        words: &'static str,
        span: Span,
        scope: &mut Scope,
    ) -> bool {
        let Some(new) = new else { return true };
        let value = self.expression(new, scope);
        if let Some(first) = end {
            self.problems.add(ShapeProblem::TruncatedTwice { span, first: first.span, end: words });
            return false;
        }
        *end = value.map(|value| End { value, span });
        value.is_some()
    }
}

/// One end of a truncation and the modifier that sets it.
struct End {
    value: Id<Expression>,
    span: Span,
}

fn group_argument(argument: &Argument) -> Option<&Name> {
    match argument {
        Argument::Group(name) => Some(name),
        Argument::Named(..) | Argument::Positional(_) => None,
    }
}

fn refused_problem(
    family: &'static Family,
    refused: &Refused,
    arguments: &[(Option<&str>, Span)],
    call: Span,
) -> DistributionProblem {
    let (family, ways) = (family.name, family.ways());
    let place = |at: usize| arguments.get(at).map_or(call, |(_, span)| *span);
    let name = |at: usize| arguments.get(at).and_then(|(name, _)| *name).unwrap_or_default().to_string();
    match refused {
        Refused::Positional { at } => {
            let span = match (at.first(), at.last()) {
                (Some(first), Some(last)) => place(*first).to(place(*last)),
                _ => call,
            };
            DistributionProblem::Positional { span, family, ways }
        }
        Refused::Unknown { at, nearest } => DistributionProblem::UnknownArgument {
            span: place(*at),
            family,
            name: name(*at),
            nearest: *nearest,
            ways,
        },
        Refused::Twice { first, second } => DistributionProblem::ArgumentTwice {
            span: place(*second),
            name: name(*second),
            first: place(*first),
        },
        Refused::Mixed { first, second } => {
            DistributionProblem::Mixed { span: place(*second), family, first: place(*first), ways }
        }
        Refused::Missing { names } => {
            let names = names.iter().map(|name| format!("`{name}`")).collect::<Vec<_>>().join(" and ");
            DistributionProblem::Missing { span: call, family, names, ways }
        }
    }
}
