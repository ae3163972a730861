//! Problems of groups, tables and settings (codes G0..).

use super::{Code, Label, NameKind, Problem, Report, Severity};
use crate::span::Span;

/// A group or a table is declared wrongly.
#[derive(Clone, Debug)]
pub enum StructureProblem {
    /// Groups that lie within each other.
    NestingCircle {
        /// Each step: the place of `within`, the inner and the outer group.
        steps: Vec<(Span, String, String)>,
    },
    /// A range whose first label is above its last.
    RangeReversed {
        /// The range.
        span: Span,
        /// First label.
        first: i64,
        /// Last label.
        last: i64,
    },
    /// A group with both a range and a list of labels.
    RangeAndLabels {
        /// The range.
        range: Span,
        /// The first listed label.
        labels: Span,
    },
    /// A label is listed twice.
    LabelTwice {
        /// The second time.
        span: Span,
        /// The first time.
        first: Span,
        /// The label.
        label: String,
    },
    /// A column without a type that is no group either.
    ColumnWithoutGroup {
        /// The column.
        span: Span,
        /// Its name.
        name: String,
        /// What else has that name, and where.
        other: Option<(NameKind, Span)>,
        /// The nearest group and its place.
        nearest: Option<(String, Span)>,
    },
    /// A column of a nested group without a column of its parent.
    ParentColumnMissing {
        /// The column.
        span: Span,
        /// Its group.
        group: String,
        /// The parent.
        parent: String,
        /// Where the group is nested.
        nested: Span,
        /// The table.
        table: String,
    },
    /// A column of a nested group beside several columns of its parent.
    ParentColumnsSeveral {
        /// The column.
        span: Span,
        /// Its group.
        group: String,
        /// The parent.
        parent: String,
        /// The columns that hold labels of the parent.
        columns: Vec<(Span, String)>,
    },
    /// A label column with something that only value columns have.
    LabelColumnExtra {
        /// The extra.
        span: Span,
        /// The column.
        column: Span,
        /// The words of the extra.
        words: &'static str,
        /// The column's name.
        name: String,
    },
    /// A covariate with gaps that is no response.
    GapsWithoutResponse {
        /// The use.
        span: Span,
        /// The column.
        column: Span,
        /// Its name.
        name: String,
    },
    /// A bound or a default that is made of more than numbers and givens.
    BoundNotConstant {
        /// The name in it.
        span: Span,
        /// The name, if it is one.
        name: Option<(String, NameKind)>,
        /// Which place it is.
        place: ConstantPlace,
    },
    /// A lower bound that is not below the upper bound.
    BoundsReversed {
        /// The lower bound.
        low: Span,
        /// The upper bound.
        high: Span,
        /// The lower bound's value.
        low_value: f64,
        /// The upper bound's value.
        high_value: f64,
    },
    /// The same index set twice behind `per`.
    DimensionTwice {
        /// The second time.
        span: Span,
        /// The first time.
        first: Span,
        /// Its name.
        name: String,
    },
    /// A table and a group that its rows already tell.
    DimensionImplied {
        /// The group.
        span: Span,
        /// The group's name.
        name: String,
        /// The table.
        by: Span,
        /// The table's name.
        by_name: String,
    },
    /// A column with `per`.
    ColumnPer {
        /// The place.
        span: Span,
        /// The table.
        table: String,
        /// The table's name.
        declared: Span,
    },
    /// A default outside its given's type.
    DefaultOutside {
        /// The default.
        span: Span,
        /// Its value.
        value: f64,
        /// The type.
        kind: Span,
        /// The type in words.
        words: String,
    },
}

/// A place where only numbers and givens can stand.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ConstantPlace {
    /// A bound of a support type.
    Support,
    /// A bound of a column's values.
    Column,
    /// The default of a given.
    Default,
}

impl From<StructureProblem> for Problem {
    fn from(problem: StructureProblem) -> Problem {
        Problem::Structure(problem)
    }
}

fn label(span: Span, text: impl Into<String>) -> Label {
    Label { span, text: text.into() }
}

impl StructureProblem {
    /// The problem as prose with its places.
    pub fn report(&self) -> Report {
        let (code, message, labels, help) = match self {
            StructureProblem::NestingCircle { steps } => {
                let first = steps.first().map_or("", |(_, inner, _)| inner);
                (
                    "G001",
                    format!("the group `{first}` lies within itself"),
                    steps
                        .iter()
                        .map(|(span, inner, outer)| label(*span, format!("`{inner}` lies within `{outer}`")))
                        .collect(),
                    "drop one `within`: the outermost group lies within nothing".into(),
                )
            }
            StructureProblem::RangeReversed { span, first, last } => (
                "G002",
                format!("the range {first}..{last} runs backwards"),
                vec![label(*span, "the first label is above the last")],
                format!("write `{last}..{first}`"),
            ),
            StructureProblem::RangeAndLabels { range, labels } => (
                "G003",
                "a group has either a range or a list of labels".into(),
                vec![label(*labels, "a list of labels"), label(*range, "a range")],
                "keep one of the two; a listed group that is `ordered` has the order of its list".into(),
            ),
            StructureProblem::LabelTwice { span, first, label: text } => (
                "G004",
                format!("the label \"{text}\" is listed twice"),
                vec![label(*span, "listed again"), label(*first, "listed here")],
                "drop one of the two".into(),
            ),
            StructureProblem::ColumnWithoutGroup { span, name, other, nearest } => {
                let mut labels = vec![label(*span, "neither a group nor a column with a type")];
                let mut help = format!(
                    "give it a type (`{name} : real`) if it holds values; declare `group {name}` if it holds labels"
                );
                if let Some((kind, at)) = other {
                    labels.push(label(*at, format!("`{name}` is {}, not a group", kind.words())));
                }
                if let Some((near, at)) = nearest {
                    labels.push(label(*at, format!("the group `{near}` is declared here")));
                    help = format!("did you mean the group `{near}`? Otherwise {help}");
                }
                ("G005", format!("the column `{name}` has no type and names no group"), labels, help)
            }
            StructureProblem::ParentColumnMissing { span, group, parent, nested, table } => (
                "G006",
                format!(
                    "the table `{table}` has a column of `{group}` but none of `{parent}`, in which it lies, and no table has both"
                ),
                vec![
                    label(*span, format!("which {parent} does this {group} lie in?")),
                    label(*nested, format!("`{group}` lies within `{parent}`")),
                ],
                format!("add the column `{parent}` to `{table}`"),
            ),
            StructureProblem::ParentColumnsSeveral { span, group, parent, columns } => {
                let mut labels = vec![label(*span, format!("which {parent} does this {group} lie in?"))];
                labels
                    .extend(columns.iter().map(|(at, name)| label(*at, format!("in the one of `{name}`?"))));
                (
                    "G007",
                    format!("a column of `{group}` stands beside several columns of `{parent}`"),
                    labels,
                    format!(
                        "keep one column of `{parent}` in this table; put the other into a table of its own"
                    ),
                )
            }
            StructureProblem::LabelColumnExtra { span, column, words, name } => {
                let mut labels = vec![label(*span, format!("`{words}` is for values"))];
                if column != span {
                    labels.push(label(*column, format!("`{name}` holds labels")));
                }
                (
                    "G008",
                    format!("the column `{name}` holds labels, and `{words}` is for values"),
                    labels,
                    format!("drop `{words}`, or give the column a type of its own, such as `{name} : real`"),
                )
            }
            StructureProblem::GapsWithoutResponse { span, column, name } => (
                "G009",
                format!(
                    "the column `{name}` has gaps and is used, but nothing says how its missing cells arise"
                ),
                vec![label(*span, "used here"), label(*column, "may have missing cells")],
                format!(
                    "add a response for it: `response {name} follows ...`; its missing cells are then estimated"
                ),
            ),
            StructureProblem::BoundNotConstant { span, name, place } => {
                let what = match name {
                    Some((name, kind)) => format!("`{name}` is {}", kind.words()),
                    None => "this is not made of numbers and givens".into(),
                };
                let (subject, help) = match place {
                    ConstantPlace::Support => (
                        "the bound of a type",
                        "write a number or a given; a bound that varies goes behind the prior: `follows ... above a`",
                    ),
                    ConstantPlace::Column => ("the bound of a column", "write a number or a given"),
                    ConstantPlace::Default => {
                        ("the default of a given", "write a number or an earlier given")
                    }
                };
                (
                    "G010",
                    format!("{subject} is made of numbers and givens only"),
                    vec![label(*span, what)],
                    help.into(),
                )
            }
            StructureProblem::BoundsReversed { low, high, low_value, high_value } => (
                "G011",
                format!("nothing lies between {low_value} and {high_value}"),
                vec![label(*low, "the lower bound"), label(*high, "is not below the upper bound")],
                if low_value > high_value {
                    format!("write `between {high_value} and {low_value}`")
                } else {
                    "make the upper bound larger".into()
                },
            ),
            StructureProblem::DimensionTwice { span, first, name } => (
                "G012",
                format!("`per {name}` stands here twice"),
                vec![label(*span, "again"), label(*first, "already here")],
                format!("keep one `per {name}`"),
            ),
            StructureProblem::DimensionImplied { span, name, by, by_name } => (
                "G013",
                format!("a row of `{by_name}` already tells its {name}"),
                vec![
                    label(*span, format!("one for each {name} ...")),
                    label(*by, format!("... of each row of `{by_name}`")),
                ],
                format!("drop `per {name}`"),
            ),
            StructureProblem::ColumnPer { span, table, declared } => (
                "G014",
                "a column holds one value for each row of its table".into(),
                vec![label(*span, "`per` cannot stand here"), label(*declared, "the table")],
                format!("drop it, or say it of the whole table: `table {table} per GROUP {{ ... }}`"),
            ),
            StructureProblem::DefaultOutside { span, value, kind, words } => (
                "G015",
                format!("the default {value} lies outside its type"),
                vec![label(*span, format!("is {value}")), label(*kind, words.clone())],
                "change the default or the type".into(),
            ),
        };
        Report { code: Code(code), severity: Severity::Error, message, labels, help }
    }
}
