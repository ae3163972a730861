//! Problems of the way from a place to a group, and of labels (codes G1..).

use super::{Code, Label, Problem, Report, Severity};
use crate::span::Span;

/// A use that finds no element, or more than one.
#[derive(Clone, Debug)]
pub enum PathProblem {
    /// There is no way from the place to a label of the group.
    NoWay {
        /// The use.
        span: Span,
        /// What is used.
        name: String,
        /// The index set that is wanted.
        wanted: String,
        /// Where what is used is declared.
        declared: Span,
        /// The declaration whose place it is.
        place: Span,
        /// What the place has, in words.
        has: String,
        /// Whether the wanted index set is a table.
        rows: bool,
        /// The table whose row the place is, if it is one.
        row: Option<String>,
    },
    /// A label test or a `per` asks for a label of a group that the place does not tell.
    NoLabel {
        /// The group's name where it is asked for.
        span: Span,
        /// The group.
        group: String,
        /// Its declaration.
        declared: Span,
        /// The declaration whose place it is.
        place: Span,
        /// What the place has, in words.
        has: String,
    },
    /// There are two ways.
    TwoWays {
        /// The use.
        span: Span,
        /// What is used.
        name: String,
        /// The index set that is wanted.
        wanted: String,
        /// The two ways in words, each with the place of the column in which they first differ.
        ways: [(Span, String); 2],
        /// The roles that would tell the two apart, where there are such.
        roles: Vec<String>,
    },
    /// Only roles lead to the group, and there are several.
    RoleNeeded {
        /// The use.
        span: Span,
        /// What is used, or nothing where a label is tested.
        name: String,
        /// The group.
        group: String,
        /// The role columns.
        roles: Vec<(Span, String)>,
        /// Whether a label test asks.
        test: bool,
    },
    /// Several tables have the role.
    RoleInSeveralTables {
        /// The role.
        span: Span,
        /// Its name.
        role: String,
        /// The columns with their tables.
        columns: Vec<(Span, String)>,
    },
    /// The role belongs to a table that the place does not reach.
    RoleOutOfReach {
        /// The role.
        span: Span,
        /// Its name.
        role: String,
        /// The column.
        column: Span,
        /// Its table.
        table: String,
        /// The declaration whose place it is.
        place: Span,
        /// What the place has, in words.
        has: String,
    },
    /// The role leads to none of the groups that the quantity varies over.
    RoleDoesNotFit {
        /// The role.
        span: Span,
        /// Its name.
        role: String,
        /// The group that the role leads to.
        group: String,
        /// The column.
        column: Span,
        /// The quantity.
        name: String,
        /// What it varies over, in words.
        varies: String,
        /// Its declaration.
        declared: Span,
    },
    /// A group that cannot have the label.
    NoSuchLabel {
        /// The label.
        span: Span,
        /// The label as text.
        label: String,
        /// The group.
        group: String,
        /// The group's declaration.
        declared: Span,
        /// Which labels it has, in words.
        labels: String,
        /// The nearest one.
        nearest: Option<String>,
    },
    /// A label of a nested group without its parents' labels.
    NestedLabel {
        /// The label.
        span: Span,
        /// The label as text.
        label: String,
        /// The group.
        group: String,
        /// The group's declaration.
        declared: Span,
        /// The pattern: `apiary/hive`.
        pattern: String,
    },
    /// Not as many selectors as the quantity has indices.
    SelectorCount {
        /// The use.
        span: Span,
        /// The quantity.
        name: String,
        /// How many selectors there are.
        found: usize,
        /// The indices.
        indices: Vec<String>,
        /// Its declaration.
        declared: Span,
    },
    /// A label for the row of a table.
    RowLabel {
        /// The selector.
        span: Span,
        /// The quantity.
        name: String,
        /// The table.
        table: String,
        /// Its declaration.
        declared: Span,
    },
    /// A label is compared with something that is no group.
    LabelComparison {
        /// The label.
        label: Span,
        /// What it is compared with.
        other: Span,
    },
}

impl From<PathProblem> for Problem {
    fn from(problem: PathProblem) -> Problem {
        Problem::Path(problem)
    }
}

fn label(span: Span, text: impl Into<String>) -> Label {
    Label { span, text: text.into() }
}

impl PathProblem {
    /// The problem as prose with its places.
    pub fn report(&self) -> Report {
        let (code, message, labels, help) = match self {
            PathProblem::NoWay { span, name, wanted, declared, place, has, rows, row } => {
                let one = row_of(wanted, *rows);
                (
                    "G101",
                    format!("`{name}` is per {wanted}, and from here no way leads to one {one}"),
                    vec![
                        label(*span, format!("which {one}?")),
                        label(*declared, format!("`{name}` has one value for each {one}")),
                        label(*place, format!("here there is {has}")),
                    ],
                    match row {
                        Some(table) if !rows => {
                            format!("add the column `{wanted}` to `{table}`, or say what is meant of all: `mean({name} over {wanted})`")
                        }
                        Some(_) => format!("say what is meant of all rows, such as `mean({name} over {wanted})`"),
                        None => format!(
                            "say what is meant of all of them, such as `mean({name} over {wanted})`, or declare this `per {wanted}`"
                        ),
                    },
                )
            }
            PathProblem::NoLabel { span, group, declared, place, has } => (
                "G101",
                format!("from here no way leads to one {group}"),
                vec![
                    label(*span, format!("which {group}?")),
                    label(*declared, format!("`{group}` is declared here")),
                    label(*place, format!("here there is {has}")),
                ],
                format!("leave it out, or add the column `{group}` to the table"),
            ),
            PathProblem::TwoWays { span, name, wanted, ways, roles } => {
                let mut labels = vec![label(*span, format!("which {wanted}?"))];
                labels.extend(ways.iter().map(|(at, words)| label(*at, words.clone())));
                let help = if roles.is_empty() {
                    format!("take one of the two columns out; in a row of a table its own column `{wanted}` would go first")
                } else {
                    let written: Vec<String> = roles.iter().map(|role| format!("`{name}[{role}]`")).collect();
                    format!("say which one is meant: {}", written.join(" or "))
                };
                ("G102", format!("two ways lead from here to one {wanted}"), labels, help)
            }
            PathProblem::RoleNeeded { span, name, group, roles, test } => {
                let mut labels = vec![label(*span, format!("which {group}?"))];
                labels.extend(roles.iter().map(|(at, role)| label(*at, format!("the one of `{role}`?"))));
                let written: Vec<String> = roles
                    .iter()
                    .map(|(_, role)| {
                        if *test { format!("`{role} == ...`") } else { format!("`{name}[{role}]`") }
                    })
                    .collect();
                (
                    "G103",
                    format!("a role is needed: several columns of the table hold labels of `{group}`"),
                    labels,
                    format!("write {}", written.join(" or ")),
                )
            }
            PathProblem::RoleInSeveralTables { span, role, columns } => {
                let mut labels = vec![label(*span, "which table's row?")];
                labels.extend(columns.iter().map(|(at, table)| label(*at, format!("`{role}` of `{table}`"))));
                (
                    "G104",
                    format!("several tables have the role `{role}`"),
                    labels,
                    "give the roles names of their own, or use it where only one of the tables can be meant".into(),
                )
            }
            PathProblem::RoleOutOfReach { span, role, column, table, place, has } => (
                "G105",
                format!("the role `{role}` belongs to a row of `{table}`, and from here no way leads to one"),
                vec![
                    label(*span, "used here"),
                    label(*column, format!("`{role}` is a column of `{table}`")),
                    label(*place, format!("here there is {has}")),
                ],
                format!("use it in a response or a let of `{table}`'s rows"),
            ),
            PathProblem::RoleDoesNotFit { span, role, group, column, name, varies, declared } => (
                "G106",
                format!("`[{role}]` tells one {group}, and `{name}` {varies}"),
                vec![
                    label(*span, "used here"),
                    label(*column, format!("`{role}` tells one {group}")),
                    label(*declared, format!("`{name}` {varies}")),
                ],
                format!("drop `[{role}]`, or declare `{name}` per {group}"),
            ),
            PathProblem::NoSuchLabel { span, label: text, group, declared, labels, nearest } => (
                "G107",
                format!("the group `{group}` has no label \"{text}\""),
                vec![label(*span, "no such label"), label(*declared, format!("its labels are {labels}"))],
                match nearest {
                    Some(near) => format!("did you mean \"{near}\"?"),
                    None => format!("write one of the group's labels, or add this one to `group {group}`"),
                },
            ),
            PathProblem::NestedLabel { span, label: text, group, declared, pattern } => (
                "G108",
                format!("\"{text}\" does not say which {group} is meant"),
                vec![label(*span, "one label is not enough"), label(*declared, format!("`{group}` is nested here"))],
                format!("write the labels from the outside in: \"{pattern}\""),
            ),
            PathProblem::SelectorCount { span, name, found, indices, declared } => {
                let varies = varies_over(indices);
                let help = if indices.is_empty() {
                    format!("write `{name}` alone")
                } else {
                    let written: Vec<String> = indices.iter().map(|index| format!("\"{index}\"")).collect();
                    format!("write one for each: `{name}[{}]`", written.join(", "))
                };
                (
                    "G109",
                    format!("{found} {} for `{name}`, which {varies}", if *found == 1 { "selector" } else { "selectors" }),
                    vec![label(*span, "selected here"), label(*declared, format!("`{name}` {varies}"))],
                    help,
                )
            }
            PathProblem::RowLabel { span, name, table, declared } => (
                "G110",
                format!("`{name}` has one value for each row of `{table}`, and rows have no labels"),
                vec![label(*span, "a label"), label(*declared, format!("`{name}` is declared here"))],
                format!("say `table {table} per GROUP` if each label has one row, or reduce: `sum({name} over {table})`"),
            ),
            PathProblem::LabelComparison { label: text, other } => (
                "G111",
                "a label is compared with something that is no group".into(),
                vec![label(*other, "neither a group nor a role"), label(*text, "a label")],
                "a label test is `group == \"label\"` or `role == \"label\"`; numbers are written without quotes".into(),
            ),
        };
        Report { code: Code(code), severity: Severity::Error, message, labels, help }
    }
}

fn row_of(index: &str, rows: bool) -> String {
    if rows { format!("row of {index}") } else { index.to_string() }
}

/// "is per season, hive" or "is a single value".
pub(crate) fn varies_over(indices: &[String]) -> String {
    if indices.is_empty() { "is a single value".into() } else { format!("is per {}", indices.join(", ")) }
}
