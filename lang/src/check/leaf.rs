//! Names and selections in expressions: which element of what is meant.

use crate::arena::Id;
use crate::model::{Access, Column, Expression, Group, Index, Labels, NamedRole, Place, Step};
use crate::nearest::nearest;
use crate::problem::{Feature, NameKind, NameProblem, PathProblem, Problem, Wanted, varies_over};
use crate::span::Span;
use crate::syntax::tree::{self, ExpressionKind, Name, Quoted, Selector};

use super::access::{Asker, RoleForm};
use super::checker::{Checker, Entity, Scope};
use super::graph::ancestors;

/// Where the label of one dimension comes from.
pub(super) enum Source<'t> {
    /// From the place.
    Here,
    /// Named in the text.
    Label(&'t Quoted),
    /// From a role column of the place's row.
    Role(Id<Column>, Span),
}

/// Something that has elements: what it is and what it varies over.
pub(super) struct Item {
    pub(super) entity: Entity,
    pub(super) dimensions: Vec<Index>,
    pub(super) declared: Span,
}

impl<'t> Checker<'t> {
    /// What a name with elements varies over; `None` where it has none or is broken.
    pub(super) fn item(&self, name: &str) -> Option<Item> {
        let declared = self.entity(name)?;
        let dimensions = match declared.entity {
            Entity::Column(column) => vec![self.rows_of(self.model.columns[column].table)],
            Entity::Unknown(id) if !self.unknowns[id.position()].broken => {
                self.unknowns[id.position()].dimensions.clone()
            }
            Entity::Named(id) if !self.named[id.position()].broken => {
                self.named[id.position()].dimensions.clone()
            }
            Entity::Given(_) => Vec::new(),
            _ => return None,
        };
        Some(Item { entity: declared.entity, dimensions, declared: declared.span })
    }

    /// A bare name.
    pub(super) fn name(&mut self, name: &'t Name, scope: &Scope) -> Option<Expression> {
        let item = self.usable(name, scope)?;
        let asker =
            Asker { span: name.span, name: &name.text, declared: item.declared, form: RoleForm::Selector };
        let targets = match item.entity {
            Entity::Column(column) => vec![Index::Table(self.model.columns[column].table)],
            _ => item.dimensions.clone(),
        };
        let mut accesses = Vec::with_capacity(targets.len());
        for target in targets {
            accesses.push(self.reach(scope, target, &asker)?);
        }
        Some(self.element(item.entity, accesses, name.span))
    }

    /// The item of a name, if it can be used here; reported otherwise.
    fn usable(&mut self, name: &Name, scope: &Scope) -> Option<Item> {
        let Some(declared) = self.entity(&name.text) else {
            self.report_no_quantity(name);
            return None;
        };
        match declared.entity {
            Entity::Group(_) | Entity::Table(_) | Entity::Part => self.report_no_quantity(name),
            Entity::Named(id) if self.named[id.position()].role == NamedRole::Derive && !scope.derived => {
                let (span, name, declared) = (name.span, name.text.clone(), declared.span);
                self.problems.add(NameProblem::DerivedInFit { span, name, declared });
            }
            _ => return self.item(&name.text),
        }
        None
    }

    fn element(&mut self, entity: Entity, accesses: Vec<Access>, span: Span) -> Expression {
        match entity {
            Entity::Given(given) => Expression::Given(given),
            Entity::Unknown(id) => Expression::Unknown(id, accesses),
            Entity::Named(id) => Expression::Named(id, accesses),
            Entity::Column(column) => {
                self.covariates.push((column, span));
                match accesses.into_iter().next() {
                    Some(access) => Expression::Column(column, access),
                    None => Expression::Number(0.0),
                }
            }
            Entity::Group(_) | Entity::Table(_) | Entity::Part | Entity::Broken => Expression::Number(0.0),
        }
    }

    /// `x["label"]`, `x[role]`.
    pub(super) fn selection(
        &mut self,
        base: Id<tree::Expression>,
        selectors: &'t [Selector],
        span: Span,
        scope: &Scope,
    ) -> Option<Expression> {
        if let Some(name) = recursion(selectors) {
            self.refuse(Feature::Recursion, name.span);
            return None;
        }
        let tree = self.tree;
        let ExpressionKind::Name(name) = &tree.expressions[base].kind else {
            let span = tree.expressions[base].span;
            let (name, found, declared) = ("this expression".to_string(), selectors.len(), span);
            self.problems.add(PathProblem::SelectorCount {
                span,
                name,
                found,
                indices: Vec::new(),
                declared,
            });
            return None;
        };
        let item = self.usable(name, scope)?;
        let sources = match self.sources(name, &item, selectors, Some(scope)) {
            Ok(sources) => sources,
            Err(problem) => {
                self.add_unless_silent(problem);
                return None;
            }
        };
        let asker = Asker { span, name: &name.text, declared: item.declared, form: RoleForm::Selector };
        let mut accesses = Some(Vec::new());
        for (index, source) in item.dimensions.iter().zip(&sources) {
            let access = self.by_source(*index, source, scope, &asker);
            accesses = accesses.zip(access).map(|(mut accesses, access)| {
                accesses.push(access);
                accesses
            });
        }
        let mut accesses = accesses?;
        if let Entity::Column(column) = item.entity {
            let table = self.model.columns[column].table;
            if self.model.tables[table].per.is_some() {
                accesses.iter_mut().for_each(|access| access.steps.push(Step::Row(table)));
            }
        }
        Some(self.element(item.entity, accesses, span))
    }

    fn add_unless_silent(&mut self, problem: Option<Box<Problem>>) {
        if let Some(problem) = problem {
            self.problems.add(*problem);
        }
    }

    fn by_source(
        &mut self,
        index: Index,
        source: &Source<'t>,
        scope: &Scope,
        asker: &Asker,
    ) -> Option<Access> {
        match (source, index) {
            (Source::Here, _) => self.reach(scope, index, asker),
            (Source::Label(quoted), Index::Group(group)) => {
                let label = self.label(group, &quoted.text, quoted.span)?;
                Some(Access { place: Place::Label(group, label), steps: Vec::new() })
            }
            (Source::Label(quoted), Index::Table(table)) => {
                self.problems.add(PathProblem::RowLabel {
                    span: quoted.span,
                    name: asker.name.to_string(),
                    table: self.model.tables[table].name.clone(),
                    declared: asker.declared,
                });
                None
            }
            (Source::Role(column, span), _) => {
                let mut access = self.role(*column, *span, scope)?;
                let group = self.labels_of(*column)?;
                access.steps.extend(self.onward(group, index, asker)?);
                Some(access)
            }
        }
    }

    /// The label in a role column of the place's row.
    pub(super) fn role(&mut self, column: Id<Column>, span: Span, scope: &Scope) -> Option<Access> {
        let held = &self.model.columns[column];
        let (name, declared, table) = (held.name.clone(), held.span, held.table);
        let rows = Index::Table(table);
        if !scope.variables.iter().any(|index| self.graph.reaches(*index, rows)) {
            self.problems.add(PathProblem::RoleOutOfReach {
                span,
                role: name,
                column: declared,
                table: self.model.tables[table].name.clone(),
                place: scope.owner,
                has: self.place_in_words(scope),
            });
            return None;
        }
        let asker = Asker { span, name: &name, declared, form: RoleForm::Test };
        let mut access = self.reach(scope, rows, &asker)?;
        access.steps.push(Step::Column(column));
        Some(access)
    }

    /// Where each dimension's label comes from. The error is `None` where another report covers it.
    pub(super) fn sources(
        &self,
        name: &Name,
        item: &Item,
        selectors: &'t [Selector],
        scope: Option<&Scope>,
    ) -> Result<Vec<Source<'t>>, Option<Box<Problem>>> {
        if let ([Selector::Role(role)], [_, ..]) = (selectors, item.dimensions.as_slice()) {
            return self.by_role(name, item, role, scope);
        }
        if selectors.len() != item.dimensions.len() {
            return Err(Some(Box::new(
                PathProblem::SelectorCount {
                    span: name.span,
                    name: name.text.clone(),
                    found: selectors.len(),
                    indices: self.index_names(&item.dimensions),
                    declared: item.declared,
                }
                .into(),
            )));
        }
        let mut sources = Vec::with_capacity(selectors.len());
        for (selector, index) in selectors.iter().zip(&item.dimensions) {
            sources.push(match selector {
                Selector::Label(label) => Source::Label(label),
                Selector::Role(role) => {
                    let one = Item { entity: item.entity, dimensions: vec![*index], declared: item.declared };
                    let found = self.by_role(name, &one, role, scope)?;
                    found.into_iter().next().unwrap_or(Source::Here)
                }
                Selector::Previous(_) | Selector::Next(_) => return Err(None),
            });
        }
        Ok(sources)
    }

    /// One role: it gives the dimensions of its own group, or, where there is none, those that its group leads to.
    fn by_role(
        &self,
        name: &Name,
        item: &Item,
        role: &Name,
        scope: Option<&Scope>,
    ) -> Result<Vec<Source<'t>>, Option<Box<Problem>>> {
        if let Some(Entity::Group(group)) = self.entity(&role.text).map(|declared| declared.entity)
            && !self.roles.contains_key(role.text.as_str())
        {
            let fits = item.dimensions.contains(&Index::Group(group));
            let here = || item.dimensions.iter().map(|_| Source::Here).collect();
            let declared = self.model.groups[group].span;
            return if fits {
                Ok(here())
            } else {
                Err(Some(Box::new(self.does_not_fit(name, item, role, group, declared))))
            };
        }
        let column = self.role_column(item, role, scope)?;
        let Some(group) = self.labels_of(column) else { return Err(None) };
        let own = Index::Group(group);
        let exact = item.dimensions.contains(&own);
        let fits = |index: &Index| if exact { *index == own } else { self.graph.reaches(own, *index) };
        if !item.dimensions.iter().any(fits) {
            let declared = self.model.columns[column].span;
            return Err(Some(Box::new(self.does_not_fit(name, item, role, group, declared))));
        }
        let source = |index: &Index| if fits(index) { Source::Role(column, role.span) } else { Source::Here };
        Ok(item.dimensions.iter().map(source).collect())
    }

    fn does_not_fit(&self, name: &Name, item: &Item, role: &Name, group: Id<Group>, column: Span) -> Problem {
        PathProblem::RoleDoesNotFit {
            span: role.span,
            role: role.text.clone(),
            group: self.model.groups[group].name.clone(),
            column,
            name: name.text.clone(),
            varies: varies_over(&self.index_names(&item.dimensions)),
            declared: item.declared,
        }
        .into()
    }

    fn role_column(
        &self,
        item: &Item,
        role: &Name,
        scope: Option<&Scope>,
    ) -> Result<Id<Column>, Option<Box<Problem>>> {
        if !self.roles.contains_key(role.text.as_str()) {
            return Err(self.no_such_role(item, role));
        }
        self.choose_role(role, scope).map_err(Some)
    }

    /// The column of a role; where several tables have it, the one that the place reaches.
    pub(super) fn choose_role(&self, role: &Name, scope: Option<&Scope>) -> Result<Id<Column>, Box<Problem>> {
        let columns = self.roles.get(role.text.as_str()).map_or(&[][..], Vec::as_slice);
        if let [only] = columns {
            return Ok(*only);
        }
        let near = |column: &&Id<Column>| {
            let rows = Index::Table(self.model.columns[**column].table);
            scope.is_some_and(|scope| scope.variables.iter().any(|index| self.graph.reaches(*index, rows)))
        };
        let reached: Vec<Id<Column>> = columns.iter().filter(near).copied().collect();
        if let [only] = reached.as_slice() {
            return Ok(*only);
        }
        let table = |column: &Id<Column>| {
            let column = &self.model.columns[*column];
            (column.span, self.model.tables[column.table].name.clone())
        };
        let columns = columns.iter().map(table).collect();
        let problem = PathProblem::RoleInSeveralTables { span: role.span, role: role.text.clone(), columns };
        Err(Box::new(problem.into()))
    }

    /// A word between brackets that is no role: perhaps a label without its quotes.
    fn no_such_role(&self, item: &Item, role: &Name) -> Option<Box<Problem>> {
        if self.uses || self.unread.contains(&role.text) {
            return None;
        }
        let (span, text) = (role.span, role.text.clone());
        if let [Index::Group(group)] = item.dimensions.as_slice() {
            let group = &self.model.groups[*group];
            let listed = matches!(&group.labels, Labels::Closed(labels) if labels.contains(&text));
            if listed || self.roles.is_empty() {
                let group = group.name.clone();
                return Some(Box::new(NameProblem::Unquoted { span, text, group }.into()));
            }
        }
        let mut names: Vec<&str> = self.roles.keys().copied().collect();
        names.sort_unstable();
        let near = nearest(&text, names.iter().copied());
        let place = |near: &str| self.roles.get(near)?.first().map(|column| self.model.columns[*column].span);
        let nearest = near.map(|near| (near.to_string(), NameKind::Role, place(near)));
        Some(Box::new(NameProblem::Unknown { span, name: text, wanted: Wanted::Role, nearest }.into()))
    }

    /// A label of a group, checked where the group's labels are known; a nested one is written from the outside in.
    pub(super) fn label(&mut self, group: Id<Group>, text: &str, span: Span) -> Option<String> {
        let mut chain = ancestors(&self.model, group);
        chain.reverse();
        chain.push(group);
        let parts: Vec<&str> = text.splitn(chain.len(), '/').collect();
        if parts.len() < chain.len() {
            let names: Vec<&str> = chain.iter().map(|id| self.model.groups[*id].name.as_str()).collect();
            self.problems.add(PathProblem::NestedLabel {
                span,
                label: text.to_string(),
                group: self.model.groups[group].name.clone(),
                declared: self.model.groups[group].span,
                pattern: names.join("/"),
            });
            return None;
        }
        let mut whole = true;
        for (id, part) in chain.into_iter().zip(parts) {
            whole &= self.label_is_known(id, part, span);
        }
        whole.then(|| text.to_string())
    }

    fn label_is_known(&mut self, id: Id<Group>, label: &str, span: Span) -> bool {
        let group = &self.model.groups[id];
        let (known, labels, near) = match &group.labels {
            Labels::Open => return true,
            Labels::Range(first, last) => {
                let inside = label.parse::<i64>().is_ok_and(|value| (*first..=*last).contains(&value));
                (inside, format!("{first} to {last}"), None)
            }
            Labels::Closed(listed) => {
                let known = listed.iter().any(|one| one == label);
                let near = nearest(label, listed.iter().map(String::as_str)).map(str::to_string);
                let shown: Vec<String> = listed.iter().take(8).map(|one| format!("\"{one}\"")).collect();
                let more = if listed.len() > 8 { ", ..." } else { "" };
                (known, format!("{}{more}", shown.join(", ")), near)
            }
        };
        if !known {
            self.problems.add(PathProblem::NoSuchLabel {
                span,
                label: label.to_string(),
                group: group.name.clone(),
                declared: group.span,
                labels,
                nearest: near,
            });
        }
        known
    }
}

/// The name behind `previous` or `next`, if one of the selectors is such.
pub(super) fn recursion(selectors: &[Selector]) -> Option<&Name> {
    selectors.iter().find_map(|selector| match selector {
        Selector::Previous(name) | Selector::Next(name) => Some(name),
        Selector::Label(_) | Selector::Role(_) => None,
    })
}
