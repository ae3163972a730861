//! Index maps: from each element of a domain to the label, row or scalar that an access leads to.

use std::collections::HashMap;
use std::sync::Arc;

use stook_lang::model::{Access, Index, Place, Step, Variable};

use crate::bind::Bound;

/// One variable of a domain.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct DomainVariable {
    /// The variable's name in expressions.
    pub variable: Variable,
    /// What it stands for.
    pub index: Index,
    /// How many elements that has.
    pub size: usize,
}

/// The elements at which an expression is evaluated: all combinations of its variables, the last one running fastest.
#[derive(Clone, Debug, PartialEq, Eq, Hash)]
pub struct Domain {
    /// The variables, outermost first.
    pub variables: Vec<DomainVariable>,
}

impl Domain {
    /// The domain of a scope: its variables are numbered from 0.
    pub fn of_scope(bound: &Bound, scope: &[Index]) -> Domain {
        let variable = |(at, index): (usize, &Index)| DomainVariable {
            variable: Variable(at as u32),
            index: *index,
            size: bound.size(*index),
        };
        Domain { variables: scope.iter().enumerate().map(variable).collect() }
    }

    /// How many elements it has.
    pub fn len(&self) -> usize {
        self.variables.iter().map(|variable| variable.size).product()
    }

    /// Whether it has none.
    pub fn is_empty(&self) -> bool {
        self.len() == 0
    }

    /// The titles of an element: one for each variable.
    pub fn titles(&self, bound: &Bound, element: usize) -> Vec<String> {
        let title = |(at, variable): (usize, &DomainVariable)| {
            bound.title(variable.index, element / self.stride(at) % variable.size)
        };
        self.variables.iter().enumerate().map(title).collect()
    }

    fn stride(&self, at: usize) -> usize {
        self.variables[at + 1..].iter().map(|variable| variable.size).product()
    }
}

/// Where each element of a domain leads.
#[derive(Clone, Debug)]
pub enum Route {
    /// All to the same.
    Fixed(u32),
    /// Each to the one at its own position, behind an offset.
    Identity(u32),
    /// Each to its own.
    Each(Arc<[u32]>),
}

impl Route {
    /// Where an element leads.
    pub fn at(&self, element: usize) -> u32 {
        match self {
            Route::Fixed(to) => *to,
            Route::Identity(offset) => offset + element as u32,
            Route::Each(to) => to[element],
        }
    }

    /// The same route, further along by an offset.
    pub fn offset(self, by: u32) -> Route {
        match self {
            Route::Fixed(to) => Route::Fixed(to + by),
            Route::Identity(offset) => Route::Identity(offset + by),
            Route::Each(to) if by == 0 => Route::Each(to),
            Route::Each(to) => Route::Each(to.iter().map(|at| at + by).collect()),
        }
    }
}

/// Finds routes and keeps those found.
#[derive(Debug, Default)]
pub(super) struct Routes {
    known: HashMap<(Domain, Access), Route>,
}

impl Routes {
    /// The route of an access over a domain.
    pub(super) fn find(&mut self, bound: &Bound, domain: &Domain, access: &Access) -> Route {
        let key = (domain.clone(), access.clone());
        if let Some(route) = self.known.get(&key) {
            return route.clone();
        }
        let mut route = start(bound, domain, &access.place);
        for step in &access.steps {
            route = take(bound, domain.len(), route, *step);
        }
        self.known.insert(key, route.clone());
        route
    }

    /// The combined route over several index sets: the position in their row-major product.
    pub(super) fn combined(&mut self, bound: &Bound, domain: &Domain, parts: &[(Access, usize)]) -> Route {
        let routes: Vec<(Route, usize)> =
            parts.iter().map(|(access, size)| (self.find(bound, domain, access), *size)).collect();
        combine(&routes, domain.len())
    }
}

/// The position in the row-major product of several index sets with their sizes.
pub(super) fn combine(routes: &[(Route, usize)], elements: usize) -> Route {
    match routes {
        [] => Route::Fixed(0),
        [(route, _)] => route.clone(),
        _ => {
            let fixed = |(route, _): &(Route, usize)| matches!(route, Route::Fixed(_));
            let position = |element: usize| {
                routes
                    .iter()
                    .fold(0u32, |position, (route, size)| position * *size as u32 + route.at(element))
            };
            if routes.iter().all(fixed) {
                Route::Fixed(position(0))
            } else {
                simplified((0..elements).map(position).collect())
            }
        }
    }
}

fn start(bound: &Bound, domain: &Domain, place: &Place) -> Route {
    match place {
        // Binding has checked that the label is there.
        Place::Label(group, label) => {
            Route::Fixed(bound.group(*group).positions.get(label).copied().unwrap_or(0))
        }
        Place::Variable(variable) => {
            let at = domain.variables.iter().position(|v| v.variable == *variable).unwrap_or(0);
            if domain.variables.len() == 1 {
                return Route::Identity(0);
            }
            let (stride, size) = (domain.stride(at), domain.variables[at].size);
            Route::Each((0..domain.len()).map(|element| (element / stride % size) as u32).collect())
        }
    }
}

fn take(bound: &Bound, elements: usize, route: Route, step: Step) -> Route {
    let map: &[u32] = match step {
        Step::Column(column) => bound.labels(column),
        Step::Parent(group) => &bound.group(group).parents,
        Step::Row(table) => &bound.table(table).row_of_label,
    };
    match route {
        Route::Fixed(at) => Route::Fixed(map[at as usize]),
        Route::Identity(_) | Route::Each(_) => {
            Route::Each((0..elements).map(|element| map[route.at(element) as usize]).collect())
        }
    }
}

/// The identity where a map is one.
fn simplified(map: Vec<u32>) -> Route {
    if map.iter().enumerate().all(|(at, to)| at as u32 == *to) {
        Route::Identity(0)
    } else {
        Route::Each(map.into())
    }
}
