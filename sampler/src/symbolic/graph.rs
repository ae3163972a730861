//! The graph of expressions: nodes are interned, so that equal expressions are one node and are worked out once.

use std::collections::{BTreeSet, HashMap};
use std::sync::Arc;

use stook_lang::arena::Id;
use stook_lang::model::{
    Access, BinaryOperator, Column, Function, Group, Index, Place, Reducer, UnaryOperator, Unknown, Variable,
};

/// The id of a node.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Sym(u32);

/// Something that a run holds a value of and moves.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Quantity {
    /// An unknown of the model.
    Unknown(Id<Unknown>),
    /// The missing cells of a response column.
    Cells(Id<Column>),
}

/// One node of the graph.
#[derive(Clone, Debug, PartialEq, Eq, Hash)]
pub enum Node {
    /// A number, by its bits.
    Number(u64),
    /// An element of an unknown.
    Unknown(Id<Unknown>, Vec<Access>),
    /// A cell of a column.
    Column(Id<Column>, Access),
    /// 1 where the access leads to the label.
    LabelTest(Access, Id<Group>, String),
    /// An operator before an expression.
    Unary(UnaryOperator, Sym),
    /// An operator between two.
    Binary(BinaryOperator, Sym, Sym),
    /// A function.
    Call(Function, Vec<Sym>),
    /// A choice.
    If(Sym, Sym, Sym),
    /// A reduction; `variable` is its own variable, the scope's next.
    Reduce {
        /// What is done.
        reducer: Reducer,
        /// What it runs over.
        over: Index,
        /// Its variable.
        variable: Variable,
        /// What is reduced.
        body: Sym,
        /// `per`: inner and outer access that must lead to the same label.
        matching: Vec<(Access, Access)>,
    },
}

/// The interned nodes.
#[derive(Debug, Default)]
pub struct Graph {
    nodes: Vec<Node>,
    depends: Vec<Arc<BTreeSet<Quantity>>>,
    index: HashMap<Node, Sym>,
    /// Columns whose missing cells are quantities.
    latent: BTreeSet<Id<Column>>,
}

impl Graph {
    /// An empty graph; the cells of the `latent` columns are quantities.
    pub fn new(latent: BTreeSet<Id<Column>>) -> Graph {
        Graph { latent, ..Graph::default() }
    }

    /// The node of an id.
    pub fn node(&self, sym: Sym) -> &Node {
        &self.nodes[sym.0 as usize]
    }

    /// The quantities that an expression depends on.
    pub fn depends(&self, sym: Sym) -> &BTreeSet<Quantity> {
        &self.depends[sym.0 as usize]
    }

    /// Whether an expression depends on a quantity.
    pub fn depends_on(&self, sym: Sym, quantity: Quantity) -> bool {
        self.depends(sym).contains(&quantity)
    }

    /// The value of a number node.
    pub fn as_number(&self, sym: Sym) -> Option<f64> {
        match self.node(sym) {
            Node::Number(bits) => Some(f64::from_bits(*bits)),
            _ => None,
        }
    }

    /// A number.
    pub fn number(&mut self, value: f64) -> Sym {
        self.intern(Node::Number(value.to_bits()))
    }

    /// Adds a node, simplified where a rule of arithmetic applies.
    pub fn add(&mut self, node: Node) -> Sym {
        match node {
            Node::Unary(operator, a) => self.unary(operator, a),
            Node::Binary(operator, a, b) => self.binary(operator, a, b),
            Node::If(c, a, b) => match self.as_number(c) {
                Some(truth) => {
                    if truth != 0.0 {
                        a
                    } else {
                        b
                    }
                }
                None if a == b => a,
                None => self.intern(Node::If(c, a, b)),
            },
            Node::Call(function, arguments) => self.call(function, arguments),
            other => self.intern(other),
        }
    }

    fn unary(&mut self, operator: UnaryOperator, a: Sym) -> Sym {
        if let Some(value) = self.as_number(a) {
            return self.number(crate::program::scalar::unary(operator, value));
        }
        match (operator, self.node(a)) {
            (UnaryOperator::Negate, Node::Unary(UnaryOperator::Negate, inner)) => *inner,
            _ => self.intern(Node::Unary(operator, a)),
        }
    }

    fn binary(&mut self, operator: BinaryOperator, a: Sym, b: Sym) -> Sym {
        use BinaryOperator as Op;
        let (left, right) = (self.as_number(a), self.as_number(b));
        if let (Some(left), Some(right)) = (left, right) {
            return self.number(crate::program::scalar::binary(operator, left, right));
        }
        match (operator, left, right) {
            (Op::Add, Some(0.0), _) | (Op::Multiply, Some(1.0), _) => b,
            (Op::Add | Op::Subtract, _, Some(0.0)) => a,
            (Op::Multiply | Op::Divide | Op::Power, _, Some(1.0)) => a,
            (Op::Multiply, Some(0.0), _) | (Op::Multiply, _, Some(0.0)) | (Op::Divide, Some(0.0), _) => {
                self.number(0.0)
            }
            (Op::Subtract, Some(0.0), _) => self.unary(UnaryOperator::Negate, b),
            // (x^p)^q is x^(pq) where x^p is the power of a positive quantity: the lowered scales only, whose base is
            // positive by their domain; a negative base would give NaN for the inner power already, unless p is whole.
            (Op::Power, _, Some(outer)) => match *self.node(a) {
                Node::Binary(Op::Power, base, inner) => match self.as_number(inner) {
                    Some(inner) if inner.fract() != 0.0 => {
                        let power = self.number(inner * outer);
                        self.binary(Op::Power, base, power)
                    }
                    _ => self.intern(Node::Binary(operator, a, b)),
                },
                _ => self.intern(Node::Binary(operator, a, b)),
            },
            _ => self.intern(Node::Binary(operator, a, b)),
        }
    }

    fn call(&mut self, function: Function, arguments: Vec<Sym>) -> Sym {
        let values: Option<Vec<f64>> = arguments.iter().map(|a| self.as_number(*a)).collect();
        match values {
            Some(values) => self.number(crate::program::scalar::call(function, &values)),
            None => self.intern(Node::Call(function, arguments)),
        }
    }

    fn intern(&mut self, node: Node) -> Sym {
        if let Some(sym) = self.index.get(&node) {
            return *sym;
        }
        let depends = self.dependencies(&node);
        let sym = Sym(self.nodes.len() as u32);
        self.nodes.push(node.clone());
        self.depends.push(depends);
        self.index.insert(node, sym);
        sym
    }

    fn dependencies(&self, node: &Node) -> Arc<BTreeSet<Quantity>> {
        let of = |sym: &Sym| &self.depends[sym.0 as usize];
        let children: Vec<&Arc<BTreeSet<Quantity>>> = match node {
            Node::Number(_) | Node::LabelTest(..) => vec![],
            Node::Unknown(unknown, _) => return Arc::new(BTreeSet::from([Quantity::Unknown(*unknown)])),
            Node::Column(column, _) if self.latent.contains(column) => {
                return Arc::new(BTreeSet::from([Quantity::Cells(*column)]));
            }
            Node::Column(..) => vec![],
            Node::Unary(_, a) => vec![of(a)],
            Node::Binary(_, a, b) => vec![of(a), of(b)],
            Node::Call(_, arguments) => arguments.iter().map(of).collect(),
            Node::If(a, b, c) => vec![of(a), of(b), of(c)],
            Node::Reduce { body, .. } => vec![of(body)],
        };
        match children.iter().find(|set| children.iter().all(|other| other.is_subset(set))) {
            Some(largest) => Arc::clone(largest),
            None => Arc::new(children.iter().flat_map(|set| set.iter().copied()).collect()),
        }
    }

    /// The scope variables that an expression uses.
    pub fn variables(&self, sym: Sym) -> BTreeSet<Variable> {
        let mut used = BTreeSet::new();
        let mut stack = vec![sym];
        let mut access = |access: &Access| {
            if let Place::Variable(variable) = access.place {
                used.insert(variable);
            }
        };
        while let Some(sym) = stack.pop() {
            match self.node(sym) {
                Node::Number(_) => {}
                Node::Unknown(_, accesses) => accesses.iter().for_each(&mut access),
                Node::Column(_, a) | Node::LabelTest(a, ..) => access(a),
                Node::Unary(_, a) => stack.push(*a),
                Node::Binary(_, a, b) => stack.extend([*a, *b]),
                Node::Call(_, arguments) => stack.extend(arguments),
                Node::If(a, b, c) => stack.extend([*a, *b, *c]),
                Node::Reduce { body, matching, .. } => {
                    matching.iter().for_each(|(_, outer)| access(outer));
                    stack.push(*body);
                }
            }
        }
        used
    }

    /// Whether an expression has the same value at every element of any domain.
    pub fn is_uniform(&self, sym: Sym) -> bool {
        self.variables(sym).is_empty()
    }
}
