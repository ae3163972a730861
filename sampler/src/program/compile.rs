//! Expressions to kernels: routes found, what depends on data alone worked out once, reductions hoisted.

use std::collections::{BTreeSet, HashMap};
use std::sync::Arc;

use stook_lang::model::{Access, Index, Place, Reducer, Step, Variable};

use super::kernel::{Elements, Kernel, OBSERVED, Op, Register, Scratch};
use super::layout::{Layout, State};
use super::route::{Domain, DomainVariable, Route, Routes, combine};
use crate::bind::Bound;
use crate::symbolic::{Node, Quantity, Sym, System};

/// Compiles expressions of one system over one set of data.
pub struct Compiler<'a> {
    bound: &'a Bound,
    system: &'a System,
    layout: &'a Layout,
    routes: Routes,
    /// The reductions that depend on the state, innermost first: the order in which they are worked out.
    pub nodes: Vec<NodeProgram>,
    known: HashMap<(Sym, Vec<DomainVariable>), Hoisted>,
    scratch: Scratch,
}

/// A reduction that depends on the state.
#[derive(Clone, Debug)]
pub struct NodeProgram {
    reducer: Reducer,
    kernel: Kernel,
    elements: usize,
    slot: Route,
    size: usize,
    /// The quantities that it depends on.
    pub depends: BTreeSet<Quantity>,
}

/// Where a reduction's value is found.
#[derive(Clone, Debug)]
enum Hoisted {
    /// It depends on data alone.
    Values(Arc<[f64]>),
    /// It is this node of the state.
    Node(usize),
}

impl<'a> Compiler<'a> {
    /// A compiler without anything compiled.
    pub fn new(bound: &'a Bound, system: &'a System, layout: &'a Layout) -> Compiler<'a> {
        Compiler {
            bound,
            system,
            layout,
            routes: Routes::default(),
            nodes: vec![],
            known: HashMap::new(),
            scratch: Scratch::default(),
        }
    }

    /// The kernel of some expressions over a domain.
    pub fn kernel(&mut self, domain: &Domain, roots: &[Sym]) -> Kernel {
        let mut building = Building { kernel: Kernel::default(), registers: HashMap::new() };
        for root in roots {
            let register = self.compile(domain, *root, &mut building);
            building.kernel.outputs.push(register);
        }
        building.kernel
    }

    /// The scalar of the state (or the row) that each element of a domain leads to, for an element of a quantity.
    pub fn places(&mut self, domain: &Domain, quantity: Quantity, accesses: &[Access]) -> Route {
        let offset = self.layout.range(quantity).start as u32;
        match quantity {
            Quantity::Unknown(unknown) => {
                let sizes = self.bound.model.unknowns[unknown].dimensions.iter().map(|d| self.bound.size(*d));
                let parts: Vec<_> = accesses.iter().cloned().zip(sizes).collect();
                self.routes.combined(self.bound, domain, &parts).offset(offset)
            }
            Quantity::Cells(_) => self.routes.find(self.bound, domain, &accesses[0]),
        }
    }

    fn compile(&mut self, domain: &Domain, sym: Sym, building: &mut Building) -> Register {
        if let Some(register) = building.registers.get(&sym) {
            return *register;
        }
        let data_only = self.system.graph.depends(sym).is_empty();
        let op = match self.system.graph.node(sym) {
            Node::Number(bits) => Op::Constant(f64::from_bits(*bits)),
            _ if data_only => self.folded(domain, sym),
            _ => self.operation(domain, sym, building),
        };
        building.push(sym, op)
    }

    /// An expression of data alone, worked out over the domain.
    fn folded(&mut self, domain: &Domain, sym: Sym) -> Op {
        let mut building = Building { kernel: Kernel::default(), registers: HashMap::new() };
        let register = self.unfolded(domain, sym, &mut building);
        building.kernel.outputs.push(register);
        if let (Op::Data(values), 1) = (&building.kernel.ops[register], building.kernel.ops.len()) {
            return constant_or(Arc::clone(values));
        }
        let state = State { values: vec![], nodes: vec![] };
        let mut values = Vec::with_capacity(domain.len());
        for chunk in Elements::Range(0, domain.len()).chunks() {
            building.kernel.run(&state, chunk, &mut self.scratch);
            values.extend_from_slice(self.scratch.output(&building.kernel, 0, chunk.len()));
        }
        constant_or(values.into())
    }

    /// The operations of an expression of data alone, without working them out.
    fn unfolded(&mut self, domain: &Domain, sym: Sym, building: &mut Building) -> Register {
        if let Some(register) = building.registers.get(&sym) {
            return *register;
        }
        let op = match self.system.graph.node(sym).clone() {
            Node::Number(bits) => Op::Constant(f64::from_bits(bits)),
            Node::Unary(operator, a) => Op::Unary(operator, self.unfolded(domain, a, building)),
            Node::Binary(operator, a, b) => {
                Op::Binary(operator, self.unfolded(domain, a, building), self.unfolded(domain, b, building))
            }
            Node::Call(function, arguments) => {
                let registers: Vec<_> =
                    arguments.iter().map(|a| self.unfolded(domain, *a, building)).collect();
                call(function, &registers)
            }
            Node::If(c, a, b) => Op::Select(
                self.unfolded(domain, c, building),
                self.unfolded(domain, a, building),
                self.unfolded(domain, b, building),
            ),
            Node::Unknown(..) | Node::Column(..) | Node::LabelTest(..) | Node::Reduce { .. } => {
                self.operation(domain, sym, building)
            }
        };
        building.push(sym, op)
    }

    fn operation(&mut self, domain: &Domain, sym: Sym, building: &mut Building) -> Op {
        match self.system.graph.node(sym).clone() {
            Node::Number(bits) => Op::Constant(f64::from_bits(bits)),
            Node::Unknown(unknown, accesses) => {
                match self.places(domain, Quantity::Unknown(unknown), &accesses) {
                    Route::Fixed(place) => Op::Scalar(place),
                    Route::Identity(offset) => Op::Block(offset),
                    Route::Each(places) => Op::Gather(places),
                }
            }
            Node::Column(column, access) => {
                let route = self.routes.find(self.bound, domain, &access);
                let (values, missing) = self.bound.values(column);
                let values = at_route(&values, &route, domain.len());
                let latent = !self.system.graph.depends(sym).is_empty();
                if latent && !missing.is_empty() {
                    let first = self.layout.range(Quantity::Cells(column)).start;
                    Op::Cells(values, cell_places(&route, domain.len(), &missing, first))
                } else {
                    Op::Data(values)
                }
            }
            Node::LabelTest(access, group, label) => {
                let wanted = self.bound.group(group).positions.get(&label).copied();
                let route = self.routes.find(self.bound, domain, &access);
                let hit = |element: usize| if Some(route.at(element)) == wanted { 1.0 } else { 0.0 };
                Op::Data((0..domain.len()).map(hit).collect())
            }
            Node::Unary(operator, a) => Op::Unary(operator, self.compile(domain, a, building)),
            Node::Binary(operator, a, b) => {
                Op::Binary(operator, self.compile(domain, a, building), self.compile(domain, b, building))
            }
            Node::Call(function, arguments) => {
                let registers: Vec<_> =
                    arguments.iter().map(|a| self.compile(domain, *a, building)).collect();
                call(function, &registers)
            }
            Node::If(c, a, b) => Op::Select(
                self.compile(domain, c, building),
                self.compile(domain, a, building),
                self.compile(domain, b, building),
            ),
            Node::Reduce { reducer, over, variable, body, matching } => {
                self.reduction(domain, sym, Reduction { reducer, over, variable, body, matching })
            }
        }
    }

    /// Reads a reduction, which is worked out once for each combination of the outer variables that its body uses and of
    /// the labels that it is grouped by.
    fn reduction(&mut self, domain: &Domain, sym: Sym, reduction: Reduction) -> Op {
        let used = self.system.graph.variables(reduction.body);
        let outer: Vec<DomainVariable> =
            domain.variables.iter().filter(|v| used.contains(&v.variable)).copied().collect();
        let hoisted = match self.known.get(&(sym, outer.clone())) {
            Some(hoisted) => hoisted.clone(),
            None => {
                let hoisted = self.hoist(&outer, &reduction);
                self.known.insert((sym, outer.clone()), hoisted.clone());
                hoisted
            }
        };
        let mut parts: Vec<(Access, usize)> = outer.iter().map(|v| (whole(v.variable), v.size)).collect();
        for (inner, access) in &reduction.matching {
            parts.push((access.clone(), self.target_size(&reduction, inner)));
        }
        let route = self.routes.combined(self.bound, domain, &parts);
        match (hoisted, route) {
            (Hoisted::Values(values), route) => constant_or(at_route(&values, &route, domain.len())),
            (Hoisted::Node(node), Route::Fixed(at)) => Op::Node(node, at),
            (Hoisted::Node(node), route) => {
                Op::NodeGather(node, (0..domain.len()).map(|element| route.at(element)).collect())
            }
        }
    }

    fn hoist(&mut self, outer: &[DomainVariable], reduction: &Reduction) -> Hoisted {
        let own = DomainVariable {
            variable: reduction.variable,
            index: reduction.over,
            size: self.bound.size(reduction.over),
        };
        let inner = Domain { variables: outer.iter().copied().chain([own]).collect() };
        let mut parts: Vec<(Access, usize)> = outer.iter().map(|v| (whole(v.variable), v.size)).collect();
        for (access, _) in &reduction.matching {
            parts.push((access.clone(), self.target_size(reduction, access)));
        }
        let routes: Vec<(Route, usize)> = parts
            .iter()
            .map(|(access, size)| (self.routes.find(self.bound, &inner, access), *size))
            .collect();
        let program = NodeProgram {
            reducer: reduction.reducer,
            kernel: self.kernel(&inner, &[reduction.body]),
            elements: inner.len(),
            slot: combine(&routes, inner.len()),
            size: parts.iter().map(|(_, size)| size).product(),
            depends: self.system.graph.depends(reduction.body).clone(),
        };
        if program.depends.is_empty() {
            let mut values = vec![];
            program.work_out(&State { values: vec![], nodes: vec![] }, &mut self.scratch, &mut values);
            return Hoisted::Values(values.into());
        }
        self.nodes.push(program);
        Hoisted::Node(self.nodes.len() - 1)
    }

    /// How many elements the index set has that an inner access of a reduction leads to.
    fn target_size(&self, reduction: &Reduction, access: &Access) -> usize {
        let model = &self.bound.model;
        let index = match access.steps.last() {
            None => reduction.over,
            Some(Step::Column(column)) => match model.columns[*column].kind {
                stook_lang::model::ColumnKind::Labels { group, .. } => Index::Group(group),
                stook_lang::model::ColumnKind::Values { .. } => reduction.over,
            },
            Some(Step::Parent(group)) => model.groups[*group].parent.map_or(reduction.over, Index::Group),
            Some(Step::Row(table)) => Index::Table(*table),
        };
        self.bound.size(index)
    }
}

struct Reduction {
    reducer: Reducer,
    over: Index,
    variable: Variable,
    body: Sym,
    matching: Vec<(Access, Access)>,
}

struct Building {
    kernel: Kernel,
    registers: HashMap<Sym, Register>,
}

impl Building {
    fn push(&mut self, sym: Sym, op: Op) -> Register {
        self.kernel.ops.push(op);
        let register = self.kernel.ops.len() - 1;
        self.registers.insert(sym, register);
        register
    }
}

fn whole(variable: Variable) -> Access {
    Access { place: Place::Variable(variable), steps: vec![] }
}

fn call(function: stook_lang::model::Function, registers: &[Register]) -> Op {
    match registers {
        [a, b] => Op::Call2(function, *a, *b),
        _ => Op::Call1(function, registers[0]),
    }
}

fn at_route(values: &Arc<[f64]>, route: &Route, elements: usize) -> Arc<[f64]> {
    match route {
        Route::Identity(0) if values.len() == elements => Arc::clone(values),
        _ => (0..elements).map(|element| values[route.at(element) as usize]).collect(),
    }
}

fn constant_or(values: Arc<[f64]>) -> Op {
    match values.first() {
        Some(first) if values.iter().all(|value| value.to_bits() == first.to_bits()) => Op::Constant(*first),
        Some(_) => Op::Data(values),
        None => Op::Constant(0.0),
    }
}

fn cell_places(route: &Route, elements: usize, missing: &[u32], first: usize) -> Arc<[u32]> {
    let place = |element: usize| match missing.binary_search(&route.at(element)) {
        Ok(at) => (first + at) as u32,
        Err(_) => OBSERVED,
    };
    (0..elements).map(place).collect()
}

impl NodeProgram {
    /// Works the reduction out from the state into `values`.
    pub fn work_out(&self, state: &State, scratch: &mut Scratch, values: &mut Vec<f64>) {
        let empty = match self.reducer {
            Reducer::Min => f64::INFINITY,
            Reducer::Max => f64::NEG_INFINITY,
            Reducer::Sum | Reducer::Mean | Reducer::Sd | Reducer::Count => 0.0,
        };
        values.clear();
        values.resize(self.size, empty);
        let mut counts = std::mem::take(&mut scratch.counts);
        let mut squares = std::mem::take(&mut scratch.squares);
        counts.clear();
        counts.resize(self.size, 0.0);
        squares.clear();
        squares.resize(self.size, 0.0);
        for chunk in Elements::Range(0, self.elements).chunks() {
            self.kernel.run(state, chunk, scratch);
            let results = scratch.output(&self.kernel, 0, chunk.len());
            chunk.for_each(|at, element| {
                let (slot, x) = (self.slot.at(element) as usize, results[at]);
                counts[slot] += 1.0;
                let value = &mut values[slot];
                match self.reducer {
                    Reducer::Sum => *value += x,
                    Reducer::Count => *value += if x != 0.0 { 1.0 } else { 0.0 },
                    Reducer::Min => *value = value.min(x),
                    Reducer::Max => *value = value.max(x),
                    // Welford (1962).
                    Reducer::Mean | Reducer::Sd => {
                        let step = x - *value;
                        *value += step / counts[slot];
                        squares[slot] += step * (x - *value);
                    }
                }
            });
        }
        for slot in 0..self.size {
            match self.reducer {
                Reducer::Sd => values[slot] = (squares[slot] / (counts[slot] - 1.0)).sqrt(),
                Reducer::Mean | Reducer::Min | Reducer::Max if counts[slot] == 0.0 => values[slot] = f64::NAN,
                _ => {}
            }
        }
        scratch.counts = counts;
        scratch.squares = squares;
    }
}
