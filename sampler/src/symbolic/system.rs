//! A model written out as statements: each unknown with its prior, each response with its law.

use std::collections::{BTreeSet, HashMap};

use stook_lang::arena::Id;
use stook_lang::distribution::Law;
use stook_lang::model::{
    Access, Column, Distribution, Expression, Index, Model, Named, NamedRole, Place, Unknown, Variable,
};
use stook_lang::span::Span;

use super::graph::{Graph, Node, Quantity, Sym};
use super::pieces::Pieces;

/// What a statement is about.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Target {
    /// The prior of an unknown.
    Unknown(Id<Unknown>),
    /// The law of a response column.
    Response(Id<Column>),
}

/// `target follows law(parameters)`, at every element of the scope.
#[derive(Clone, Debug)]
pub struct Statement {
    /// What it is about.
    pub target: Target,
    /// Its index sets: the unknown's dimensions, or the response's table.
    pub scope: Vec<Index>,
    /// The canonical law.
    pub law: Law,
    /// Its canonical parameters.
    pub parameters: Vec<Sym>,
    /// The truncation's lower end.
    pub low: Option<Sym>,
    /// The truncation's upper end.
    pub high: Option<Sym>,
    /// The distribution's name in the text.
    pub name: &'static str,
    /// Where it stands.
    pub span: Span,
}

impl Statement {
    /// Parameters and truncation.
    pub fn roots(&self) -> impl Iterator<Item = Sym> + '_ {
        self.parameters.iter().copied().chain(self.low).chain(self.high)
    }

    /// The quantity that the statement gives the law of.
    pub fn quantity(&self) -> Quantity {
        match self.target {
            Target::Unknown(unknown) => Quantity::Unknown(unknown),
            Target::Response(column) => Quantity::Cells(column),
        }
    }

    /// Whether the law is truncated.
    pub fn is_truncated(&self) -> bool {
        self.low.is_some() || self.high.is_some()
    }
}

/// A model written out.
#[derive(Debug)]
pub struct System {
    /// All expressions.
    pub graph: Graph,
    /// The priors in the order of the model, then the responses.
    pub statements: Vec<Statement>,
    /// The derived quantities.
    pub derived: Vec<(Id<Named>, Sym)>,
    /// The additive pieces of each response's location, in the order of the responses; `None` where its law has none.
    pub pieces: Vec<Option<Pieces>>,
}

impl System {
    /// Writes out a model with the values of its settings, by position of their ids.
    pub fn new(model: &Model, givens: &[f64]) -> System {
        let latent = model.responses.iter().map(|response| response.column);
        let latent: BTreeSet<_> = latent.filter(|column| model.has_gaps(*column)).collect();
        let mut writer = Writer { model, givens, graph: Graph::new(latent), written: HashMap::new() };
        let mut statements = Vec::new();
        for (id, unknown) in model.unknowns.iter() {
            statements.push(writer.statement(Target::Unknown(id), &unknown.dimensions, &unknown.prior));
        }
        let mut pieces = Vec::new();
        for response in &model.responses {
            let scope = [writer.row_of(response.column)];
            statements.push(writer.statement(
                Target::Response(response.column),
                &scope,
                &response.distribution,
            ));
            pieces.push(writer.pieces(&response.distribution, &Scope::root(1)));
        }
        let mut derived = Vec::new();
        for (id, item) in model.named.iter().filter(|(_, item)| item.role == NamedRole::Derive) {
            derived.push((id, writer.write(item.value, &Scope::root(item.dimensions.len()))));
        }
        System { graph: writer.graph, statements, derived, pieces }
    }

    /// The statement that gives the law of a quantity.
    pub fn law_of(&self, quantity: Quantity) -> Option<usize> {
        self.statements.iter().position(|statement| statement.quantity() == quantity)
    }

    /// The statements whose parameters depend on a quantity.
    pub fn children(&self, quantity: Quantity) -> Vec<usize> {
        let touches =
            |statement: &Statement| statement.roots().any(|root| self.graph.depends_on(root, quantity));
        (0..self.statements.len()).filter(|at| touches(&self.statements[*at])).collect()
    }
}

/// The scope at a place while names are written out: what each variable of the text stands for there.
#[derive(Clone, Debug)]
pub(super) struct Scope {
    /// For each variable of the expression at hand, the access that it stands for.
    pub(super) variables: Vec<Access>,
    /// The number of variables of the outermost scope and the reductions around.
    pub(super) depth: u32,
}

impl Scope {
    fn root(dimensions: usize) -> Scope {
        let variables =
            (0..dimensions as u32).map(|v| Access { place: Place::Variable(Variable(v)), steps: vec![] });
        Scope { variables: variables.collect(), depth: dimensions as u32 }
    }

    pub(super) fn access(&self, access: &Access) -> Access {
        match &access.place {
            Place::Label(..) => access.clone(),
            Place::Variable(Variable(at)) => {
                let mut found = self.variables[*at as usize].clone();
                found.steps.extend(access.steps.iter().copied());
                found
            }
        }
    }
}

pub(super) struct Writer<'a> {
    pub(super) model: &'a Model,
    givens: &'a [f64],
    pub(super) graph: Graph,
    written: HashMap<(Id<Named>, Vec<Access>, u32), Sym>,
}

impl Writer<'_> {
    /// What a row of a column's table stands for.
    fn row_of(&self, column: Id<Column>) -> Index {
        Index::Table(self.model.columns[column].table)
    }

    fn statement(&mut self, target: Target, scope: &[Index], law: &Distribution) -> Statement {
        let place = Scope::root(scope.len());
        let parameters = law.parameters.iter().map(|p| self.write(*p, &place)).collect();
        let low = law.low.map(|low| self.write(low, &place));
        let high = law.high.map(|high| self.write(high, &place));
        Statement {
            target,
            scope: scope.to_vec(),
            law: law.law,
            parameters,
            low,
            high,
            name: law.name,
            span: law.span,
        }
    }

    pub(super) fn write(&mut self, id: Id<Expression>, scope: &Scope) -> Sym {
        let model = self.model;
        let node = match &model.expressions[id] {
            Expression::Number(value) => return self.graph.number(*value),
            Expression::Given(given) => return self.graph.number(self.givens[given.position()]),
            Expression::Named(named, accesses) => return self.named(*named, accesses, scope),
            Expression::Unknown(unknown, accesses) => {
                Node::Unknown(*unknown, accesses.iter().map(|a| scope.access(a)).collect())
            }
            Expression::Column(column, access) => Node::Column(*column, scope.access(access)),
            Expression::LabelTest { access, group, label } => {
                Node::LabelTest(scope.access(access), *group, label.clone())
            }
            Expression::Unary(operator, a) => Node::Unary(*operator, self.write(*a, scope)),
            Expression::Binary(operator, a, b) => {
                Node::Binary(*operator, self.write(*a, scope), self.write(*b, scope))
            }
            Expression::Call(function, arguments) => {
                Node::Call(*function, arguments.iter().map(|a| self.write(*a, scope)).collect())
            }
            Expression::If(c, a, b) => {
                Node::If(self.write(*c, scope), self.write(*a, scope), self.write(*b, scope))
            }
            Expression::Reduce { reducer, over, body, matching } => {
                let variable = Variable(scope.depth);
                let mut inner = scope.clone();
                inner.variables.push(Access { place: Place::Variable(variable), steps: vec![] });
                inner.depth += 1;
                let body = self.write(*body, &inner);
                let matching = matching.iter().map(|(a, b)| (inner.access(a), scope.access(b))).collect();
                Node::Reduce { reducer: *reducer, over: *over, variable, body, matching }
            }
        };
        self.graph.add(node)
    }

    /// A name is its value, seen from the elements that its accesses lead to.
    fn named(&mut self, named: Id<Named>, accesses: &[Access], scope: &Scope) -> Sym {
        let accesses: Vec<Access> = accesses.iter().map(|a| scope.access(a)).collect();
        let key = (named, accesses, scope.depth);
        if let Some(sym) = self.written.get(&key) {
            return *sym;
        }
        let inner = Scope { variables: key.1.clone(), depth: scope.depth };
        let sym = self.write(self.model.named[named].value, &inner);
        self.written.insert(key, sym);
        sym
    }
}
