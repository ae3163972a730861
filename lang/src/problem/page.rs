//! The pages that `explain CODE` prints.

use super::explain::{name, path, shape, structure, unsupported};
use super::{Code, distribution, identity, ladder, support, syntax};

/// A page on one code: what it means, a wrong and a right example. The tests compile both.
#[derive(Clone, Copy, Debug)]
pub struct Page {
    /// The code.
    pub code: Code,
    /// One line.
    pub title: &'static str,
    /// A few sentences.
    pub text: &'static str,
    /// A model that has the problem.
    pub wrong: &'static str,
    /// The same model without it.
    pub right: &'static str,
}

/// Every page, by code.
pub fn pages() -> impl Iterator<Item = &'static Page> {
    [
        syntax::PAGES,
        name::PAGES,
        structure::PAGES,
        path::PAGES,
        shape::PAGES,
        distribution::PAGES,
        support::PAGES,
        ladder::PAGES,
        identity::PAGES,
        unsupported::PAGES,
    ]
    .into_iter()
    .flatten()
}

/// The page of a code, in any case of letters.
pub fn page(code: &str) -> Option<&'static Page> {
    pages().find(|page| page.code.0.eq_ignore_ascii_case(code))
}
