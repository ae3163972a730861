//! Children's messages gathered for every element of a quantity in one pass over the rows.

use stook_lang::distribution::Law;

use super::Chain;
use super::rows::{Context, Part};
use crate::bind::Bound;
use crate::plan::{Form, Message};
use crate::program::{Compiler, Domain, Elements, Kernel, Layout, Program, Route};
use crate::symbolic::{Quantity, Statement, Sym, System};

/// One child, compiled: for each of its rows the numbers that its message is made of.
#[derive(Clone, Debug)]
struct Source {
    factor: usize,
    /// Outputs: the message's coefficient first, then what the form asks for.
    kernel: Kernel,
    /// The element of the quantity that each row refers to, behind the quantity's offset; for a column's cells the row.
    leaf: Route,
    form: Form,
    law: Law,
    /// The rows summed once for their squares, where that can be.
    part: Option<Part>,
}

/// The messages of all children of a quantity.
#[derive(Clone, Debug)]
pub struct Gatherer {
    sources: Vec<Source>,
    /// The place of the quantity in the state.
    first: usize,
    /// For a column's cells, the cell of each row; else empty.
    cells: Vec<u32>,
    /// The sums.
    pub sums: Vec<Gathered>,
}

/// The sum of the messages to one element; what `a` and `b` mean depends on the form.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Gathered {
    /// Mean: sum of c (y - r) / s^2. Power: sum of a. Share: weight of log x.
    pub a: f64,
    /// Mean: sum of c^2 / s^2. Power: sum of b. Share: weight of log(1 - x).
    pub b: f64,
}

impl Gatherer {
    /// Compiles the messages to a quantity.
    pub fn new<'a>(
        compiler: &mut Compiler<'a>,
        bound: &'a Bound,
        layout: &'a Layout,
        system: &'a System,
        quantity: Quantity,
        messages: &[Message],
    ) -> Gatherer {
        // For sums of squares every place of the state is a scalar of its own.
        let places: Vec<u32> = (0..layout.len() as u32).collect();
        let source = |message: &Message| {
            let statement = &system.statements[message.statement];
            let domain = Domain::of_scope(bound, &statement.scope);
            Source {
                factor: message.statement,
                kernel: compiler.kernel(&domain, &needs(statement, &message.form)),
                leaf: compiler.places(&domain, quantity, &message.leaf.accesses),
                form: message.form.clone(),
                law: statement.law,
                part: message.rows.as_ref().map(|rows| {
                    Part::new(&mut Context { compiler, bound, layout, system, columns: &places }, rows)
                }),
            }
        };
        let sources = messages.iter().map(source).collect();
        let range = layout.range(quantity);
        let cells = match quantity {
            Quantity::Unknown(_) => vec![],
            Quantity::Cells(column) => {
                let (values, missing) = bound.values(column);
                let mut cells = vec![u32::MAX; values.len()];
                missing.iter().zip(0u32..).for_each(|(row, cell)| cells[*row as usize] = cell);
                cells
            }
        };
        Gatherer { sources, first: range.start, cells, sums: vec![Gathered::default(); range.len()] }
    }

    /// The exponents of power messages, one for each child.
    pub fn exponents(&self) -> impl Iterator<Item = f64> + '_ {
        self.sources.iter().filter_map(|source| match source.form {
            Form::Power { exponent, .. } => Some(exponent),
            Form::Mean { .. } | Form::Share { .. } => None,
        })
    }

    /// Gathers the messages of all children at the chain's state into `sums`.
    pub fn gather(&mut self, program: &Program, chain: &mut Chain) {
        self.gather_where(program, chain, |_| true);
    }

    /// Gathers the messages of the children whose power message has this exponent.
    pub fn gather_exponent(&mut self, program: &Program, chain: &mut Chain, wanted: f64) {
        self.gather_where(
            program,
            chain,
            |form| matches!(form, Form::Power { exponent, .. } if *exponent == wanted),
        );
    }

    fn gather_where(&mut self, program: &Program, chain: &mut Chain, wanted: impl Fn(&Form) -> bool) {
        self.sums.fill(Gathered::default());
        for source in self.sources.iter().filter(|source| wanted(&source.form)) {
            let factor = &program.factors[source.factor];
            if let Some(squares) = source.part.as_ref().and_then(|part| part.squares(&chain.state)) {
                source.kernel.run(&chain.state, Elements::Range(0, 1), &mut chain.scratch);
                let coefficient = chain.scratch.register(&source.kernel, 0)[0];
                self.sums[0].a += 0.5 * factor.elements().len() as f64;
                self.sums[0].b += 0.5 * squares / (coefficient * coefficient);
                continue;
            }
            for chunk in factor.elements().chunks() {
                source.kernel.run(&chain.state, chunk, &mut chain.scratch);
                let scratch = &chain.scratch;
                let (state, sums, cells, first) = (&chain.state, &mut self.sums, &self.cells, self.first);
                chunk.for_each(|at, row| {
                    let to = source.leaf.at(row) as usize;
                    let to = if cells.is_empty() { to - first } else { cells[to] as usize };
                    if let Some(sum) = sums.get_mut(to) {
                        let output = |which: usize| scratch.register(&source.kernel, which)[at];
                        let message = source.message(factor.value(state, row), output);
                        sum.a += message.a;
                        sum.b += message.b;
                    }
                });
            }
        }
    }
}

/// The expressions that a message is made of: see [`Source::message`], which reads them in this order.
fn needs(statement: &Statement, form: &Form) -> Vec<Sym> {
    match form {
        Form::Mean { coefficient, rest } => vec![*coefficient, *rest, statement.parameters[1]],
        Form::Power { coefficient, .. } => match statement.law {
            Law::Normal | Law::Lognormal | Law::Laplace | Law::Gamma | Law::InverseGamma | Law::Weibull => {
                vec![*coefficient, statement.parameters[0]]
            }
            _ => vec![*coefficient],
        },
        Form::Share { .. } => match statement.law {
            Law::Binomial => vec![statement.parameters[0]],
            _ => vec![],
        },
    }
}

impl Source {
    /// The message of one row whose target has the value `y`. The formulas are those of the log densities, with the
    /// parameter written as coefficient * x^power.
    #[inline]
    fn message(&self, y: f64, output: impl Fn(usize) -> f64) -> Gathered {
        match self.form {
            Form::Mean { .. } => {
                let (c, rest, sd) = (output(0), output(1), output(2));
                let y = if self.law == Law::Lognormal { libm::log(y) } else { y };
                let weight = c / (sd * sd);
                Gathered { a: weight * (y - rest), b: weight * c }
            }
            Form::Power { .. } => {
                let c = output(0);
                match self.law {
                    Law::Normal => half_square(y - output(1), c),
                    Law::Lognormal => half_square(libm::log(y) - output(1), c),
                    Law::HalfNormal => half_square(y, c),
                    Law::Laplace => Gathered { a: 1.0, b: (y - output(1)).abs() / c },
                    Law::Exponential => Gathered { a: 1.0, b: c * y },
                    Law::Poisson => Gathered { a: y, b: c },
                    Law::Gamma => Gathered { a: output(1), b: c * y },
                    Law::InverseGamma => Gathered { a: output(1), b: c / y },
                    Law::Weibull => Gathered { a: 1.0, b: libm::pow(y / c, output(1)) },
                    // Only the laws above give a power message: `plan::message` names them.
                    _ => Gathered { a: f64::NAN, b: f64::NAN },
                }
            }
            Form::Share { complement } => {
                let trials = if self.law == Law::Binomial { output(0) } else { 1.0 };
                let (yes, no) = (y, trials - y);
                if complement { Gathered { a: no, b: yes } } else { Gathered { a: yes, b: no } }
            }
        }
    }
}

fn half_square(residual: f64, coefficient: f64) -> Gathered {
    let scaled = residual / coefficient;
    Gathered { a: 0.5, b: 0.5 * scaled * scaled }
}
