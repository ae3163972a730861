//! Kernels: expressions as columns of operations, evaluated for a chunk of elements at a time.

use std::sync::Arc;

use stook_lang::model::{BinaryOperator, Function, UnaryOperator};

use super::layout::State;
use super::scalar;

/// Elements that are evaluated at a time: registers of this length stay in the first-level cache.
pub const CHUNK: usize = 256;

/// The elements of a chunk.
#[derive(Clone, Copy, Debug)]
pub enum Elements<'a> {
    /// `start..start + len`.
    Range(usize, usize),
    /// These.
    List(&'a [u32]),
}

impl<'a> Elements<'a> {
    /// How many.
    pub fn len(self) -> usize {
        match self {
            Elements::Range(_, len) => len,
            Elements::List(list) => list.len(),
        }
    }

    /// Whether there are none.
    pub fn is_empty(self) -> bool {
        self.len() == 0
    }

    /// Pieces of at most [`CHUNK`] elements.
    pub fn chunks(self) -> impl Iterator<Item = Elements<'a>> {
        let pieces = self.len().div_ceil(CHUNK);
        (0..pieces).map(move |piece| {
            let from = piece * CHUNK;
            let len = CHUNK.min(self.len() - from);
            match self {
                Elements::Range(start, _) => Elements::Range(start + from, len),
                Elements::List(list) => Elements::List(&list[from..from + len]),
            }
        })
    }

    /// Calls `each` with the position in the chunk and the element.
    #[inline(always)]
    pub fn for_each(self, mut each: impl FnMut(usize, usize)) {
        match self {
            Elements::Range(start, len) => (0..len).for_each(|at| each(at, start + at)),
            Elements::List(list) => {
                list.iter().enumerate().for_each(|(at, element)| each(at, *element as usize))
            }
        }
    }
}

/// A register: the result of the operation at that position of the kernel.
pub(super) type Register = usize;

/// One operation.
#[derive(Clone, Debug)]
pub enum Op {
    /// A number.
    Constant(f64),
    /// A value for each element of the domain.
    Data(Arc<[f64]>),
    /// The same scalar of the state for all.
    Scalar(u32),
    /// The scalars behind an offset, in the order of the domain.
    Block(u32),
    /// A scalar of the state for each element.
    Gather(Arc<[u32]>),
    /// A cell of a column with missing cells: its value, or the scalar of the state where that map has one.
    Cells(Arc<[f64]>, Arc<[u32]>),
    /// The same value of a reduction for all.
    Node(usize, u32),
    /// A value of a reduction for each element.
    NodeGather(usize, Arc<[u32]>),
    /// An operator before a register.
    Unary(UnaryOperator, Register),
    /// An operator between two.
    Binary(BinaryOperator, Register, Register),
    /// A function of one.
    Call1(Function, Register),
    /// A function of two.
    Call2(Function, Register, Register),
    /// The second where the first is not 0, else the third.
    Select(Register, Register, Register),
}

impl Op {
    fn operands(&self, mut each: impl FnMut(Register)) {
        match self {
            Op::Constant(_)
            | Op::Data(_)
            | Op::Scalar(_)
            | Op::Block(_)
            | Op::Gather(_)
            | Op::Cells(..)
            | Op::Node(..)
            | Op::NodeGather(..) => {}
            Op::Unary(_, a) | Op::Call1(_, a) => each(*a),
            Op::Binary(_, a, b) | Op::Call2(_, a, b) => {
                each(*a);
                each(*b);
            }
            Op::Select(a, b, c) => [*a, *b, *c].into_iter().for_each(each),
        }
    }

    fn with_operands(&self, moved: &[Register]) -> Op {
        match self {
            Op::Unary(operator, a) => Op::Unary(*operator, moved[*a]),
            Op::Call1(function, a) => Op::Call1(*function, moved[*a]),
            Op::Binary(operator, a, b) => Op::Binary(*operator, moved[*a], moved[*b]),
            Op::Call2(function, a, b) => Op::Call2(*function, moved[*a], moved[*b]),
            Op::Select(a, b, c) => Op::Select(moved[*a], moved[*b], moved[*c]),
            other => other.clone(),
        }
    }
}

/// No scalar: the mark of an observed cell in [`Op::Cells`].
pub const OBSERVED: u32 = u32::MAX;

/// Operations in order, and the registers that hold the results.
#[derive(Clone, Debug, Default)]
pub struct Kernel {
    /// The operations.
    pub ops: Vec<Op>,
    /// The registers of the results.
    pub outputs: Vec<Register>,
}

/// Registers of a thread.
#[derive(Debug, Default)]
pub struct Scratch {
    registers: Vec<[f64; CHUNK]>,
    /// A column for what is worked out from the results.
    pub column: Vec<f64>,
    /// The target's values of a chunk.
    pub(super) values: Vec<f64>,
    /// Counts of a reduction's slots.
    pub(super) counts: Vec<f64>,
    /// Sums of squares of a reduction's slots.
    pub(super) squares: Vec<f64>,
}

impl Scratch {
    /// The result of an output for the chunk that was run last.
    pub fn output<'s>(&'s self, kernel: &Kernel, output: usize, len: usize) -> &'s [f64] {
        &self.registers[kernel.outputs[output]][..len]
    }

    /// The whole register of an output.
    #[inline]
    pub fn register(&self, kernel: &Kernel, output: usize) -> &[f64; CHUNK] {
        &self.registers[kernel.outputs[output]]
    }

    /// Room for kernels of so many operations.
    pub fn reserve(&mut self, ops: usize) {
        if self.registers.len() < ops {
            self.registers.resize(ops, [0.0; CHUNK]);
        }
    }
}

impl Kernel {
    /// The kernel of the first outputs, with the operations that they need.
    pub fn first_outputs(&self, outputs: usize) -> Kernel {
        let mut needed = vec![false; self.ops.len()];
        let mut stack: Vec<Register> = self.outputs[..outputs].to_vec();
        while let Some(register) = stack.pop() {
            if !std::mem::replace(&mut needed[register], true) {
                self.ops[register].operands(|operand| stack.push(operand));
            }
        }
        let mut moved = vec![0; self.ops.len()];
        let mut ops = vec![];
        for (at, op) in self.ops.iter().enumerate().filter(|(at, _)| needed[*at]) {
            moved[at] = ops.len();
            ops.push(op.with_operands(&moved));
        }
        Kernel { ops, outputs: self.outputs[..outputs].iter().map(|register| moved[*register]).collect() }
    }

    /// Evaluates every operation for one chunk of at most [`CHUNK`] elements.
    pub fn run(&self, state: &State, elements: Elements<'_>, scratch: &mut Scratch) {
        scratch.reserve(self.ops.len());
        let len = elements.len();
        for (at, op) in self.ops.iter().enumerate() {
            let (before, rest) = scratch.registers.split_at_mut(at);
            let out = &mut rest[0][..len];
            match op {
                Op::Constant(value) => out.fill(*value),
                Op::Data(values) => match elements {
                    Elements::Range(start, len) => out.copy_from_slice(&values[start..start + len]),
                    Elements::List(list) => fill(out, list, |element| values[element as usize]),
                },
                Op::Scalar(place) => out.fill(state.values[*place as usize]),
                Op::Block(offset) => {
                    let offset = *offset as usize;
                    match elements {
                        Elements::Range(start, len) => {
                            out.copy_from_slice(&state.values[offset + start..offset + start + len]);
                        }
                        Elements::List(list) => {
                            fill(out, list, |element| state.values[offset + element as usize])
                        }
                    }
                }
                Op::Gather(places) => gather(out, elements, places, &state.values),
                Op::Cells(values, places) => elements.for_each(|to, element| {
                    let place = places[element];
                    out[to] = if place == OBSERVED { values[element] } else { state.values[place as usize] };
                }),
                Op::Node(node, at) => out.fill(state.nodes[*node][*at as usize]),
                Op::NodeGather(node, places) => gather(out, elements, places, &state.nodes[*node]),
                Op::Unary(operator, a) => map(out, &before[*a], |a| scalar::unary(*operator, a)),
                Op::Binary(operator, a, b) => binary(*operator, out, &before[*a], &before[*b]),
                Op::Call1(Function::Exp, a) => map(out, &before[*a], libm::exp),
                Op::Call1(Function::Log, a) => map(out, &before[*a], libm::log),
                Op::Call1(function, a) => map(out, &before[*a], |a| scalar::call(*function, &[a])),
                Op::Call2(function, a, b) => {
                    zip(out, &before[*a], &before[*b], |a, b| scalar::call(*function, &[a, b]));
                }
                Op::Select(condition, a, b) => {
                    let (condition, a, b) = (&before[*condition], &before[*a], &before[*b]);
                    for at in 0..len {
                        out[at] = if condition[at] != 0.0 { a[at] } else { b[at] };
                    }
                }
            }
        }
    }
}

fn fill(out: &mut [f64], list: &[u32], value: impl Fn(u32) -> f64) {
    for (out, element) in out.iter_mut().zip(list) {
        *out = value(*element);
    }
}

fn gather(out: &mut [f64], elements: Elements<'_>, places: &[u32], from: &[f64]) {
    match elements {
        Elements::Range(start, len) => {
            for (out, place) in out.iter_mut().zip(&places[start..start + len]) {
                *out = from[*place as usize];
            }
        }
        Elements::List(list) => fill(out, list, |element| from[places[element as usize] as usize]),
    }
}

#[inline(always)]
fn map(out: &mut [f64], a: &[f64], f: impl Fn(f64) -> f64) {
    for (out, a) in out.iter_mut().zip(a) {
        *out = f(*a);
    }
}

#[inline(always)]
fn zip(out: &mut [f64], a: &[f64], b: &[f64], f: impl Fn(f64, f64) -> f64) {
    for ((out, a), b) in out.iter_mut().zip(a).zip(b) {
        *out = f(*a, *b);
    }
}

/// The arithmetic operators have loops of their own, which the compiler turns into vector instructions.
fn binary(operator: BinaryOperator, out: &mut [f64], a: &[f64], b: &[f64]) {
    match operator {
        BinaryOperator::Add => zip(out, a, b, |a, b| a + b),
        BinaryOperator::Subtract => zip(out, a, b, |a, b| a - b),
        BinaryOperator::Multiply => zip(out, a, b, |a, b| a * b),
        BinaryOperator::Divide => zip(out, a, b, |a, b| a / b),
        _ => zip(out, a, b, |a, b| scalar::binary(operator, a, b)),
    }
}
