//! The parameterisation that a call means.

use super::family::{Family, Form};
use crate::span::Span;

/// The form that a call means, and where each of its arguments comes from.
#[derive(Clone, Debug)]
pub struct Choice {
    /// The form.
    pub form: &'static Form,
    /// For each argument of the form the position of the written one; `None` for one that is left out.
    pub written: Vec<Option<usize>>,
}

/// Why a call means no form. Positions are those of the written arguments.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Refused {
    /// Arguments without names.
    Positional {
        /// Which.
        at: Vec<usize>,
    },
    /// A name that no form has.
    Unknown {
        /// Which.
        at: usize,
        /// The nearest one.
        nearest: Option<&'static str>,
    },
    /// The same name twice.
    Twice {
        /// The first.
        first: usize,
        /// The second.
        second: usize,
    },
    /// Names of two forms.
    Mixed {
        /// One.
        first: usize,
        /// The other.
        second: usize,
    },
    /// Too few for any form.
    Missing {
        /// The names that the nearest form lacks.
        names: Vec<&'static str>,
    },
}

/// Finds the form that a call means: its arguments are `(name, place)`, the name `None` where it is left out.
pub fn choose(family: &'static Family, arguments: &[(Option<&str>, Span)]) -> Result<Choice, Vec<Refused>> {
    let mut refused = vec![];
    let positional: Vec<usize> = (0..arguments.len()).filter(|at| arguments[*at].0.is_none()).collect();
    if !positional.is_empty() {
        refused.push(Refused::Positional { at: positional });
    }
    let known = family.argument_names();
    for (at, (name, _)) in arguments.iter().enumerate() {
        let Some(name) = name else { continue };
        if !known.contains(name) {
            refused
                .push(Refused::Unknown { at, nearest: crate::nearest::nearest(name, known.iter().copied()) });
        }
        if let Some(first) = arguments[..at].iter().position(|(other, _)| *other == Some(*name)) {
            refused.push(Refused::Twice { first, second: at });
        }
    }
    if !refused.is_empty() {
        return Err(refused);
    }
    match family.forms.iter().find(|form| is_meant(form, arguments)) {
        Some(form) => {
            let place = |name: &str| arguments.iter().position(|(written, _)| *written == Some(name));
            Ok(Choice { form, written: form.arguments.iter().map(|argument| place(argument.name)).collect() })
        }
        None => Err(vec![mixed_or_missing(family, arguments)]),
    }
}

/// Whether a form has every written argument and lacks none that must be written.
fn is_meant(form: &Form, arguments: &[(Option<&str>, Span)]) -> bool {
    let has = |name: &str| form.arguments.iter().any(|argument| argument.name == name);
    let is_written = |name: &str| arguments.iter().any(|(written, _)| *written == Some(name));
    arguments.iter().all(|(name, _)| name.is_some_and(has))
        && form.arguments.iter().all(|argument| argument.default.is_some() || is_written(argument.name))
}

fn mixed_or_missing(family: &'static Family, arguments: &[(Option<&str>, Span)]) -> Refused {
    let has =
        |form: &Form, name: Option<&str>| form.arguments.iter().any(|argument| Some(argument.name) == name);
    let fitting: Vec<&Form> =
        family.forms.iter().filter(|form| arguments.iter().all(|(name, _)| has(form, *name))).collect();
    if let Some(form) = fitting.first() {
        let lacking = form.arguments.iter().filter(|argument| {
            argument.default.is_none() && !arguments.iter().any(|(name, _)| *name == Some(argument.name))
        });
        return Refused::Missing { names: lacking.map(|argument| argument.name).collect() };
    }
    // Two names that no form has together.
    for second in 0..arguments.len() {
        for first in 0..second {
            let together = |form: &Form| has(form, arguments[first].0) && has(form, arguments[second].0);
            if !family.forms.iter().any(together) {
                return Refused::Mixed { first, second };
            }
        }
    }
    Refused::Mixed { first: 0, second: arguments.len().saturating_sub(1) }
}
