//! Support types, bounds, settings and dimensions.

use crate::arena::Id;
use crate::model::{ColumnKind, Demand, Expression, Given, Index, Rule, Support};
use crate::problem::{ConstantPlace, Feature, NameProblem, ShapeProblem, StructureProblem, Wanted};
use crate::syntax::tree::{self, Name, SupportKind, SupportSyntax};

use super::checker::{Checker, Entity};

/// The words for plain support types.
pub(super) const SUPPORTS: [(&str, Support); 5] = [
    ("real", Support::REAL),
    ("positive", Support::Positive),
    ("fraction", Support::Fraction),
    ("count", Support::Count),
    ("yesno", Support::YesNo),
];

/// The words for update rules.
pub(super) const RULES: [(&str, Rule); 4] = [
    ("conjugate", Rule::Conjugate),
    ("slice", Rule::Slice),
    ("joint", Rule::Joint),
    ("enumerate", Rule::Enumerate),
];

/// The lower and the upper bound, where there are such.
type Bounds = (Option<Id<Expression>>, Option<Id<Expression>>);

impl<'t> Checker<'t> {
    /// Works out the settings in order: a default can use those above it.
    pub(super) fn read_givens(&mut self) {
        for at in 0..self.givens.len() {
            let item = self.givens[at].declaration;
            if let Some(extra) = item.kind.per.first().or(item.kind.over.as_ref()) {
                self.problems.add(ShapeProblem::GivenPer { span: extra.span, name: item.name.text.clone() });
            }
            let support = self.support(&item.kind.support);
            let default = self.constant(item.default, ConstantPlace::Default);
            let value = default.and_then(|default| self.constant_value(default));
            if let (Some(support), Some(value)) = (support, value) {
                self.check_default(support, value, item);
            }
            let draft = &mut self.givens[at];
            draft.support = support.unwrap_or(UNTOLD);
            draft.default = default;
            let given = self.given(at);
            self.model.givens.add(given);
        }
    }

    /// The setting of a draft. Where its default is wrong there is no model; the default then compares with nothing.
    fn given(&mut self, at: usize) -> Given {
        let draft = &self.givens[at];
        let item = draft.declaration;
        let (support, documentation) = (draft.support, draft.documentation.cloned());
        let default = draft
            .default
            .unwrap_or_else(|| self.model.expressions.add(Expression::Number(f64::NAN), item.name.span));
        Given {
            name: item.name.text.clone(),
            span: item.name.span,
            documentation,
            support,
            unit: item.kind.unit.as_ref().map(|unit| unit.text.clone()),
            default,
        }
    }

    fn check_default(&mut self, support: Support, value: f64, item: &tree::GivenDeclaration) {
        let inside = match support {
            Support::Real { low, high } => {
                let [low, high] = [low, high].map(|bound| bound.and_then(|bound| self.constant_value(bound)));
                low.is_none_or(|low| value >= low) && high.is_none_or(|high| value <= high)
            }
            Support::Positive => value > 0.0,
            Support::Fraction => (0.0..=1.0).contains(&value),
            Support::Count => value >= 0.0 && value.fract() == 0.0,
            Support::YesNo => value == 0.0 || value == 1.0,
        };
        if !value.is_nan() && (!inside || value.is_infinite()) {
            self.problems.add(StructureProblem::DefaultOutside {
                span: self.tree.expressions[item.default].span,
                value,
                kind: item.kind.support.span,
                words: support_in_words(support).into(),
            });
        }
    }

    /// Reads the types and bounds of value columns.
    pub(super) fn read_column_types(&mut self) {
        for (id, column) in std::mem::take(&mut self.value_columns) {
            let Some(clause) = &column.kind else { continue };
            if let Some(per) = clause.per.first() {
                let table = &self.model.tables[self.model.columns[id].table];
                let (table, declared) = (table.name.clone(), table.span);
                self.problems.add(StructureProblem::ColumnPer { span: per.span, table, declared });
            }
            let (read_support, range) = match &clause.support.kind {
                // In a column `positive between 0 and 20` is the type and a range that is checked.
                SupportKind::Bounded { word, low: Some(low), high: Some(high) } => {
                    (self.support_word(word), Some((*low, *high)))
                }
                SupportKind::Bounded { word, .. } if word.text != "real" => {
                    self.refuse_column_bounds(&clause.support, word);
                    continue;
                }
                _ => (self.support(&clause.support), None),
            };
            let read_between = column.between.or(range).and_then(|(low, high)| {
                let (low, high) = self.bounds(Some(low), Some(high), ConstantPlace::Column)?;
                low.zip(high)
            });
            if let ColumnKind::Values { support, between, .. } = &mut self.model.columns[id].kind {
                *support = read_support.unwrap_or(UNTOLD);
                *between = read_between;
            }
        }
    }

    fn refuse_column_bounds(&mut self, syntax: &SupportSyntax, word: &Name) {
        if self.support_word(word).is_some() {
            let bounds = "between a and b".to_string();
            let (span, word) = (syntax.span, word.text.clone());
            self.problems.add(ShapeProblem::BoundedType { span, word, bounds, place: ConstantPlace::Column });
        }
    }

    /// Reads the types and dimensions of unknowns.
    pub(super) fn read_unknown_types(&mut self) {
        for at in 0..self.unknowns.len() {
            let item = self.unknowns[at].declaration;
            if let Some(over) = &item.kind.over {
                self.refuse(Feature::DrawnTogether, over.span);
            }
            if let Some(word) = item.demand.as_ref().filter(|word| demand(Some(word)).is_none()) {
                self.report_unknown(word, Wanted::Rule);
            }
            let support = self.support(&item.kind.support);
            let dimensions = self.dimensions(&item.kind.per);
            let draft = &mut self.unknowns[at];
            draft.support = support.unwrap_or(UNTOLD);
            // What is refused as a whole is silent where it is used.
            draft.broken = dimensions.is_none() || support.is_none() || item.kind.over.is_some();
            draft.dimensions = dimensions.unwrap_or_default();
            draft.untyped = support.is_none();
            draft.refused = item.kind.over.is_some()
                || matches!(item.kind.support.kind, SupportKind::Over { .. } | SupportKind::OneOf(_));
        }
    }

    /// The index sets behind `per`; a parent beside its nested group is implied and dropped.
    fn dimensions(&mut self, per: &'t [Name]) -> Option<Vec<Index>> {
        let mut found: Vec<(Index, &Name)> = Vec::new();
        let mut whole = true;
        for name in per {
            let Some(index) = self.index(name) else {
                whole = false;
                continue;
            };
            if let Some((_, first)) = found.iter().find(|(other, _)| *other == index) {
                let (span, first, name) = (name.span, first.span, name.text.clone());
                self.problems.add(StructureProblem::DimensionTwice { span, first, name });
                continue;
            }
            found.push((index, name));
        }
        let indices: Vec<Index> = found.iter().map(|(index, _)| *index).collect();
        for (index, name) in &found {
            let by = found.iter().find(|(other, _)| {
                matches!(other, Index::Table(_)) && other != index && self.graph.reaches(*other, *index)
            });
            if let (Index::Group(_), Some((_, by))) = (index, by) {
                self.problems.add(StructureProblem::DimensionImplied {
                    span: name.span,
                    name: name.text.clone(),
                    by: by.span,
                    by_name: by.text.clone(),
                });
            }
        }
        let kept =
            indices.iter().copied().filter(|index| !self.is_ancestor_of_any(*index, &indices)).collect();
        whole.then_some(kept)
    }

    fn is_ancestor_of_any(&self, index: Index, others: &[Index]) -> bool {
        let Index::Group(group) = index else { return false };
        others.iter().any(|other| match other {
            Index::Group(other) => super::graph::ancestors(&self.model, *other).contains(&group),
            Index::Table(_) => false,
        })
    }

    /// Reads a support type; what is wrong or not supported is reported.
    pub(super) fn support(&mut self, syntax: &SupportSyntax) -> Option<Support> {
        match &syntax.kind {
            SupportKind::Word(word) => self.support_word(word),
            SupportKind::Bounded { word, low, high } => {
                let plain = self.support_word(word)?;
                if plain != Support::REAL {
                    let bounds = self.bounds_in_words(*low, *high);
                    let (span, word) = (syntax.span, word.text.clone());
                    self.problems.add(ShapeProblem::BoundedType {
                        span,
                        word,
                        bounds,
                        place: ConstantPlace::Support,
                    });
                    return None;
                }
                let (low, high) = self.bounds(*low, *high, ConstantPlace::Support)?;
                Some(Support::Real { low, high })
            }
            SupportKind::Over { word, .. } => {
                if ["shares", "covariance", "correlation"].contains(&word.text.as_str()) {
                    self.refuse(Feature::MatrixType, syntax.span);
                } else {
                    self.report_unknown(word, Wanted::Support);
                }
                None
            }
            SupportKind::OneOf(_) => {
                self.refuse(Feature::LatentClass, syntax.span);
                None
            }
        }
    }

    fn support_word(&mut self, word: &Name) -> Option<Support> {
        if let Some((_, support)) = SUPPORTS.iter().find(|(name, _)| *name == word.text) {
            return Some(*support);
        }
        if ["shares", "covariance", "correlation"].contains(&word.text.as_str()) {
            self.refuse(Feature::MatrixType, word.span);
            return None;
        }
        match self.entity(&word.text) {
            Some(declared) if matches!(declared.entity, Entity::Group(_)) => {
                let kind = self.entity_kind(declared.entity);
                let (span, name, declared) = (word.span, word.text.clone(), declared.span);
                self.problems.add(NameProblem::WrongKind {
                    span,
                    name,
                    kind,
                    declared,
                    wanted: Wanted::Support,
                });
            }
            _ => self.report_unknown(word, Wanted::Support),
        }
        None
    }

    /// Reads bounds of numbers and givens; `None` where one of them is wrong.
    fn bounds(
        &mut self,
        low: Option<Id<tree::Expression>>,
        high: Option<Id<tree::Expression>>,
        place: ConstantPlace,
    ) -> Option<Bounds> {
        let [read_low, read_high] = [low, high].map(|bound| bound.map(|bound| self.constant(bound, place)));
        let low_id = read_low.map_or(Some(None), |bound| bound.map(Some))?;
        let high_id = read_high.map_or(Some(None), |bound| bound.map(Some))?;
        let value = |bound: Option<Id<Expression>>| bound.and_then(|bound| self.constant_value(bound));
        if let (Some(low_value), Some(high_value)) = (value(low_id), value(high_id))
            && low_value >= high_value
        {
            let span =
                |bound: Option<Id<tree::Expression>>| bound.map(|bound| self.tree.expressions[bound].span);
            if let (Some(low), Some(high)) = (span(low), span(high)) {
                self.problems.add(StructureProblem::BoundsReversed { low, high, low_value, high_value });
            }
            return None;
        }
        Some((low_id, high_id))
    }

    fn bounds_in_words(
        &self,
        low: Option<Id<tree::Expression>>,
        high: Option<Id<tree::Expression>>,
    ) -> String {
        let word = |bound: Id<tree::Expression>, otherwise: &str| match self.tree.expressions[bound].kind {
            tree::ExpressionKind::Number(value) => value.to_string(),
            _ => otherwise.to_string(),
        };
        match (low, high) {
            (Some(low), Some(high)) => format!("between {} and {}", word(low, "a"), word(high, "b")),
            (Some(low), None) => format!("above {}", word(low, "a")),
            (None, Some(high)) => format!("below {}", word(high, "b")),
            (None, None) => String::new(),
        }
    }
}

/// The demand of an unknown, where its word is a rule.
pub(super) fn demand(word: Option<&Name>) -> Option<Demand> {
    let word = word?;
    let (_, rule) = RULES.iter().find(|(name, _)| *name == word.text)?;
    Some(Demand { rule: *rule, span: word.span })
}

/// Stands where a type could not be told: it fits wherever a quantity may stand, so nothing follows from the mistake.
const UNTOLD: Support = Support::Fraction;

/// The type in words, for labels.
fn support_in_words(support: Support) -> &'static str {
    match support {
        Support::Real { .. } => "outside these bounds",
        Support::Positive => "above 0",
        Support::Fraction => "between 0 and 1",
        Support::Count => "a whole number from 0",
        Support::YesNo => "0 or 1",
    }
}
