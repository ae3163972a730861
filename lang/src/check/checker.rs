//! What the checker knows while it works.

use std::collections::{HashMap, HashSet};

use crate::arena::{Arena, Id};
use crate::model::{
    Column, Distribution, Expression, Given, Group, Index, Model, Named, NamedRole, Rung, Support, Table,
    Unknown,
};
use crate::problem::{Feature, Problems, Unsupported};
use crate::span::Span;
use crate::syntax::tree::{
    ColumnDeclaration, DeclarationKind, ExpressionDeclaration, GivenDeclaration, ResponseDeclaration, Tree,
    UnknownDeclaration,
};

use super::WrittenArgument;
use super::graph::Graph;

/// What a name stands for.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Entity {
    Group(Id<Group>),
    Table(Id<Table>),
    Column(Id<Column>),
    Given(Id<Given>),
    Unknown(Id<Unknown>),
    Named(Id<Named>),
    Part,
    /// Its declaration is wrong; uses of it are silent.
    Broken,
}

/// A name's declaration.
#[derive(Clone, Copy, Debug)]
pub(super) struct Declared {
    pub(super) span: Span,
    pub(super) entity: Entity,
}

pub(super) struct GivenDraft<'t> {
    pub(super) declaration: &'t GivenDeclaration,
    pub(super) documentation: Option<&'t String>,
    pub(super) support: Support,
    pub(super) default: Option<Id<Expression>>,
}

pub(super) struct UnknownDraft<'t> {
    pub(super) declaration: &'t UnknownDeclaration,
    pub(super) documentation: Option<&'t String>,
    pub(super) support: Support,
    pub(super) dimensions: Vec<Index>,
    /// Its type or dimensions could not be read.
    pub(super) broken: bool,
    /// Its type is wrong, so its prior is not held against it.
    pub(super) untyped: bool,
    /// Its type is of a kind that this version does not have.
    pub(super) refused: bool,
    pub(super) prior: Option<Distribution>,
}

pub(super) struct NamedDraft<'t> {
    pub(super) declaration: &'t ExpressionDeclaration,
    pub(super) documentation: Option<&'t String>,
    pub(super) role: NamedRole,
    pub(super) dimensions: Vec<Index>,
    /// Its dimensions are not known for sure, because something in it is wrong.
    pub(super) broken: bool,
    pub(super) value: Option<Id<Expression>>,
}

pub(super) struct ResponseDraft<'t> {
    pub(super) declaration: &'t ResponseDeclaration,
    pub(super) span: Span,
    pub(super) column: Option<Id<Column>>,
    pub(super) distribution: Option<Distribution>,
}

/// The place of an expression: the variables that stand for a label or a row.
pub(super) struct Scope {
    /// The dimensions of the owner, then one for each reduction around the place.
    pub(super) variables: Vec<Index>,
    /// How many of them are dimensions of the owner.
    pub(super) base: usize,
    /// The declaration that the expression belongs to.
    pub(super) owner: Span,
    /// Whether derived quantities may be used.
    pub(super) derived: bool,
}

impl Scope {
    pub(super) fn new(dimensions: &[Index], owner: Span) -> Scope {
        Scope { variables: dimensions.to_vec(), base: dimensions.len(), owner, derived: false }
    }
}

pub(super) struct Checker<'t> {
    pub(super) tree: &'t Tree,
    /// Groups, tables, columns and expressions go straight into the model; the rest is drafted.
    pub(super) model: Model,
    pub(super) problems: Problems,
    pub(super) names: HashMap<&'t str, Declared>,
    pub(super) group_ids: HashMap<&'t str, Id<Group>>,
    /// Role columns by name; each table may have one of the same name.
    pub(super) roles: HashMap<&'t str, Vec<Id<Column>>>,
    /// Names that may be declared in a part of the text that could not be read.
    pub(super) unread: HashSet<String>,
    /// Whether another file is used, so that unknown names may come from there.
    pub(super) uses: bool,
    /// Bare columns that name no group.
    pub(super) bare: Vec<&'t ColumnDeclaration>,
    pub(super) value_columns: Vec<(Id<Column>, &'t ColumnDeclaration)>,
    pub(super) givens: Vec<GivenDraft<'t>>,
    pub(super) unknowns: Vec<UnknownDraft<'t>>,
    pub(super) named: Vec<NamedDraft<'t>>,
    pub(super) responses: Vec<ResponseDraft<'t>>,
    pub(super) ladder: Arena<Rung>,
    pub(super) graph: Graph,
    /// Uses of columns as covariates.
    pub(super) covariates: Vec<(Id<Column>, Span)>,
    /// The arguments of distributions as written, with what each must be.
    pub(super) written_arguments: Vec<WrittenArgument>,
    /// How deep the expression at work is nested.
    pub(super) depth: usize,
}

impl<'t> Checker<'t> {
    pub(super) fn new(tree: &'t Tree, unread: HashSet<String>) -> Checker<'t> {
        let uses = tree.declarations.iter().any(|item| matches!(item.kind, DeclarationKind::Use(_)));
        Checker {
            tree,
            model: Model::default(),
            problems: Problems::default(),
            names: HashMap::new(),
            group_ids: HashMap::new(),
            roles: HashMap::new(),
            unread,
            uses,
            bare: Vec::new(),
            value_columns: Vec::new(),
            givens: Vec::new(),
            unknowns: Vec::new(),
            named: Vec::new(),
            responses: Vec::new(),
            ladder: Arena::default(),
            graph: Graph::default(),
            covariates: Vec::new(),
            written_arguments: Vec::new(),
            depth: 0,
        }
    }

    /// Reports a feature that this version does not have.
    pub(super) fn refuse(&mut self, feature: Feature, span: Span) {
        self.problems.add(Unsupported { feature, span });
    }

    /// Where an index set is declared.
    pub(super) fn index_span(&self, index: Index) -> Span {
        match index {
            Index::Group(group) => self.model.groups[group].span,
            Index::Table(table) => self.model.tables[table].span,
        }
    }

    /// The names of index sets.
    pub(super) fn index_names(&self, indices: &[Index]) -> Vec<String> {
        indices.iter().map(|index| self.model.index_name(*index).to_string()).collect()
    }
}
