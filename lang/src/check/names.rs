//! The namespace: what each name stands for, double declarations, and unknown names with the nearest known one.

use std::collections::HashSet;

use crate::arena::Id;
use crate::distribution;
use crate::model::{ColumnKind, Function, Index, NamedRole, Reducer, Support};
use crate::nearest::nearest;
use crate::problem::{Feature, NameKind, NameProblem, Wanted};
use crate::span::Span;
use crate::syntax::Tree;
use crate::syntax::tree::{Declaration, DeclarationKind, Name};

use super::checker::{Checker, Declared, Entity, GivenDraft, NamedDraft, ResponseDraft, UnknownDraft};

/// The parts that the prelude will bring; calls of them are refused as parts.
pub(super) const PRELUDE_PARTS: [&str; 6] = ["varying", "slopes", "walk", "drift", "smooth", "neighbours"];

/// The reducer of a name.
pub(super) fn reducer(name: &str) -> Option<Reducer> {
    REDUCERS.iter().find(|(word, _)| *word == name).map(|(_, reducer)| *reducer)
}

pub(super) const REDUCERS: [(&str, Reducer); 6] = [
    ("sum", Reducer::Sum),
    ("mean", Reducer::Mean),
    ("sd", Reducer::Sd),
    ("min", Reducer::Min),
    ("max", Reducer::Max),
    ("count", Reducer::Count),
];

/// The function of a name.
pub(super) fn function(name: &str) -> Option<Function> {
    Function::ALL.into_iter().find(|function| function.name() == name)
}

/// The words in the parts of a text that no declaration of the tree covers: what could not be read may declare them.
pub(super) fn unread(text: &str, tree: &Tree) -> HashSet<String> {
    let mut covered: Vec<(usize, usize)> =
        tree.declarations.iter().map(|item| (item.span.start as usize, item.span.end as usize)).collect();
    covered.sort_unstable();
    covered.push((text.len(), text.len()));
    let mut words = HashSet::new();
    let mut from = 0;
    for (start, end) in covered {
        if let Some(gap) = text.get(from..start.max(from)) {
            words.extend(
                gap.split(|c: char| !c.is_alphanumeric() && c != '_')
                    .filter(|word| !word.is_empty())
                    .map(str::to_string),
            );
        }
        from = from.max(end);
    }
    words
}

impl<'t> Checker<'t> {
    /// Gives every declaration its name, in the order of the text.
    pub(super) fn collect_names(&mut self) {
        let mut group = 0;
        for declaration in &self.tree.declarations {
            let documentation = declaration.documentation.as_ref();
            match &declaration.kind {
                DeclarationKind::Group(item) => {
                    self.declare(&item.name, Entity::Group(Id::new(group)));
                    group += 1;
                }
                DeclarationKind::Table(item) => self.collect_table(item, documentation),
                DeclarationKind::Given(item) => {
                    self.declare(&item.name, Entity::Given(Id::new(self.givens.len())));
                    self.givens.push(GivenDraft {
                        declaration: item,
                        documentation,
                        support: Support::REAL,
                        default: None,
                    });
                }
                DeclarationKind::Unknown(item) => {
                    self.declare(&item.name, Entity::Unknown(Id::new(self.unknowns.len())));
                    self.unknowns.push(UnknownDraft {
                        declaration: item,
                        documentation,
                        support: Support::REAL,
                        dimensions: Vec::new(),
                        broken: false,
                        untyped: false,
                        refused: false,
                        prior: None,
                    });
                }
                DeclarationKind::Term(_) | DeclarationKind::Let(_) | DeclarationKind::Derive(_) => {
                    self.collect_named(declaration)
                }
                DeclarationKind::Response(item) => self.responses.push(ResponseDraft {
                    declaration: item,
                    span: declaration.span,
                    column: None,
                    distribution: None,
                }),
                DeclarationKind::Part(item) => {
                    self.declare(&item.name, Entity::Part);
                    self.refuse(Feature::Part, item.name.span);
                }
                DeclarationKind::Use(item) => self.refuse(Feature::Use, item.file.span),
                DeclarationKind::Ladder(_) => {}
            }
        }
    }

    fn collect_named(&mut self, declaration: &'t Declaration) {
        let (item, role) = match &declaration.kind {
            DeclarationKind::Term(item) => (item, NamedRole::Term),
            DeclarationKind::Let(item) => (item, NamedRole::Let),
            DeclarationKind::Derive(item) => (item, NamedRole::Derive),
            _ => return,
        };
        self.declare(&item.name, Entity::Named(Id::new(self.named.len())));
        self.named.push(NamedDraft {
            declaration: item,
            documentation: declaration.documentation.as_ref(),
            role,
            dimensions: Vec::new(),
            broken: false,
            value: None,
        });
    }

    /// Enters a name; the first declaration of a name keeps it.
    pub(super) fn declare(&mut self, name: &'t Name, entity: Entity) {
        let Some(first) = self.names.get(name.text.as_str()).copied() else {
            self.names.insert(&name.text, Declared { span: name.span, entity });
            return;
        };
        if let (Entity::Column(one), Entity::Column(other)) = (first.entity, entity) {
            let [one_table, other_table] = [one, other].map(|column| self.model.columns[column].table);
            if one_table != other_table {
                self.problems.add(NameProblem::ColumnInTwoTables {
                    span: name.span,
                    name: name.text.clone(),
                    table: self.model.tables[other_table].name.clone(),
                    heading: self.model.columns[other].heading.clone(),
                    first: first.span,
                    first_table: self.model.tables[one_table].name.clone(),
                });
                return;
            }
        }
        let kind = self.entity_kind(entity);
        let first_kind = self.entity_kind(first.entity);
        self.problems.add(NameProblem::Twice {
            span: name.span,
            name: name.text.clone(),
            kind,
            first: first.span,
            first_kind,
        });
    }

    /// What an entity is.
    pub(super) fn entity_kind(&self, entity: Entity) -> NameKind {
        match entity {
            Entity::Group(_) => NameKind::Group,
            Entity::Table(_) => NameKind::Table,
            Entity::Column(_) | Entity::Broken => NameKind::Column,
            Entity::Given(_) => NameKind::Given,
            Entity::Unknown(_) => NameKind::Unknown,
            Entity::Part => NameKind::Part,
            Entity::Named(id) => match self.named.get(id.position()).map(|named| named.role) {
                Some(NamedRole::Term) => NameKind::Term,
                Some(NamedRole::Derive) => NameKind::Derive,
                // The name is entered just before its draft, so only the first of a doubled name can lack one.
                Some(NamedRole::Let) | None => NameKind::Let,
            },
        }
    }

    /// What a name of the text stands for.
    pub(super) fn entity(&self, name: &str) -> Option<Declared> {
        self.names.get(name).copied()
    }

    /// The group or table of a name; anything else is reported.
    pub(super) fn index(&mut self, name: &Name) -> Option<Index> {
        match self.entity(&name.text).map(|declared| declared.entity) {
            Some(Entity::Group(group)) => Some(Index::Group(group)),
            Some(Entity::Table(table)) => Some(Index::Table(table)),
            _ => {
                self.report_name(name, Wanted::Index);
                None
            }
        }
    }

    /// Reports a name that does not fit: unknown with the nearest one, or of the wrong kind.
    pub(super) fn report_name(&mut self, name: &Name, wanted: Wanted) {
        match self.entity(&name.text) {
            Some(Declared { entity: Entity::Broken, .. }) => {}
            Some(declared) => {
                let kind = self.entity_kind(declared.entity);
                self.problems.add(NameProblem::WrongKind {
                    span: name.span,
                    name: name.text.clone(),
                    kind,
                    declared: declared.span,
                    wanted,
                });
            }
            None => match self.roles.get(name.text.as_str()).and_then(|columns| columns.first()) {
                Some(column) if wanted != Wanted::Role => self.problems.add(NameProblem::WrongKind {
                    span: name.span,
                    name: name.text.clone(),
                    kind: NameKind::Role,
                    declared: self.model.columns[*column].span,
                    wanted,
                }),
                _ => self.report_unknown(name, wanted),
            },
        }
    }

    /// Reports a name that nothing has, unless it may come from a part of the text that could not be read.
    pub(super) fn report_unknown(&mut self, name: &Name, wanted: Wanted) {
        if self.uses || self.unread.contains(&name.text) {
            return;
        }
        let mut candidates: Vec<(&str, NameKind, Option<Span>)> = match wanted {
            Wanted::Function => {
                let functions = Function::ALL.into_iter().map(|f| (f.name(), NameKind::Function, None));
                functions.chain(REDUCERS.map(|(word, _)| (word, NameKind::Reducer, None))).collect()
            }
            Wanted::Distribution => {
                distribution::ALL.iter().map(|family| (family.name, NameKind::Distribution, None)).collect()
            }
            Wanted::Rule => super::types::RULES.map(|(word, _)| (word, NameKind::Function, None)).to_vec(),
            Wanted::Support => {
                super::types::SUPPORTS.map(|(word, _)| (word, NameKind::Function, None)).to_vec()
            }
            Wanted::Role => {
                let columns = self.roles.iter().filter_map(|(name, columns)| Some((*name, columns.first()?)));
                columns.map(|(name, id)| (name, NameKind::Role, Some(self.model.columns[*id].span))).collect()
            }
            _ => self
                .names
                .iter()
                .map(|(name, declared)| (*name, self.entity_kind(declared.entity), Some(declared.span)))
                .filter(|(_, kind, _)| fits(*kind, wanted))
                .collect(),
        };
        candidates.sort_unstable_by_key(|(name, ..)| *name);
        let near = nearest(&name.text, candidates.iter().map(|(name, ..)| *name));
        let found = near.and_then(|near| candidates.iter().find(|(name, ..)| *name == near));
        let found = found.map(|(name, kind, span)| (name.to_string(), *kind, *span));
        self.problems.add(NameProblem::Unknown {
            span: name.span,
            name: name.text.clone(),
            wanted,
            nearest: found,
        });
    }

    /// Reports a name that stands for no value where a value is wanted.
    pub(super) fn report_no_quantity(&mut self, name: &Name) {
        let text = name.text.as_str();
        let (kind, declared) = if let Some(declared) = self.entity(text) {
            if declared.entity == Entity::Broken {
                return;
            }
            (self.entity_kind(declared.entity), Some(declared.span))
        } else if let Some(column) = self.roles.get(text).and_then(|columns| columns.first()) {
            (NameKind::Role, Some(self.model.columns[*column].span))
        } else if self.uses || self.unread.contains(text) {
            return;
        } else if reducer(text).is_some() && function(text).is_none() {
            (NameKind::Reducer, None)
        } else if function(text).is_some() {
            (NameKind::Function, None)
        } else if distribution::named(text).is_some() {
            (NameKind::Distribution, None)
        } else {
            self.report_unknown(name, Wanted::Quantity);
            return;
        };
        self.problems.add(NameProblem::NotAQuantity {
            span: name.span,
            name: name.text.clone(),
            kind,
            declared,
        });
    }

    /// Whether a column holds labels, and of which group.
    pub(super) fn labels_of(&self, column: Id<crate::model::Column>) -> Option<Id<crate::model::Group>> {
        match self.model.columns[column].kind {
            ColumnKind::Labels { group, .. } => Some(group),
            ColumnKind::Values { .. } => None,
        }
    }
}

fn fits(kind: NameKind, wanted: Wanted) -> bool {
    match wanted {
        Wanted::Group => kind == NameKind::Group,
        Wanted::Index => matches!(kind, NameKind::Group | NameKind::Table),
        Wanted::Quantity => matches!(
            kind,
            NameKind::Given
                | NameKind::Unknown
                | NameKind::Let
                | NameKind::Term
                | NameKind::Derive
                | NameKind::Column
        ),
        Wanted::Column => kind == NameKind::Column,
        Wanted::Term => kind == NameKind::Term,
        Wanted::Role
        | Wanted::Rung
        | Wanted::Function
        | Wanted::Distribution
        | Wanted::Reducer
        | Wanted::Rule
        | Wanted::Support => false,
    }
}
