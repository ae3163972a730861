//! The syntax tree: what was written, with its places, and nothing of what it means.

use crate::arena::{Arena, Id};
use crate::span::Span;

/// A parsed text: its declarations in order and the arena of their expressions.
#[derive(Clone, Debug, Default)]
pub struct Tree {
    /// The declarations, in the order of the text. A declaration with a mistake in it is left out.
    pub declarations: Vec<Declaration>,
    /// The names of declarations that were left out: uses of them are no mistakes of their own.
    pub lost: Vec<String>,
    /// The expressions of all declarations.
    pub expressions: Arena<Expression>,
}

/// A name and where it stands.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Name {
    /// The identifier.
    pub text: String,
    /// Its place.
    pub span: Span,
}

/// A quoted text without its quotes.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Quoted {
    /// The text between the quotes.
    pub text: String,
    /// Its place, quotes included.
    pub span: Span,
}

/// One declaration.
#[derive(Clone, Debug)]
pub struct Declaration {
    /// The whole declaration.
    pub span: Span,
    /// The `##` comment before it, its lines joined by newlines.
    pub documentation: Option<String>,
    /// What it declares.
    pub kind: DeclarationKind,
}

/// What a declaration declares.
#[derive(Clone, Debug)]
pub enum DeclarationKind {
    /// `group`.
    Group(GroupDeclaration),
    /// `table`.
    Table(TableDeclaration),
    /// `given`.
    Given(GivenDeclaration),
    /// `unknown`.
    Unknown(UnknownDeclaration),
    /// `term`.
    Term(ExpressionDeclaration),
    /// `let`.
    Let(ExpressionDeclaration),
    /// `response`.
    Response(ResponseDeclaration),
    /// `derive`.
    Derive(ExpressionDeclaration),
    /// `part`.
    Part(PartDeclaration),
    /// `ladder`.
    Ladder(LadderDeclaration),
    /// `use`.
    Use(UseDeclaration),
}

/// `group NAME [within NAME] [ordered [A..B]] [{ LABELS }]`.
#[derive(Clone, Debug)]
pub struct GroupDeclaration {
    /// The group's name.
    pub name: Name,
    /// The group that it is nested in.
    pub within: Option<Name>,
    /// The word `ordered`.
    pub ordered: Option<Span>,
    /// `A..B` behind `ordered`.
    pub range: Option<LabelRange>,
    /// The labels between braces: names, whole numbers or quoted texts, as text.
    pub labels: Option<Vec<Quoted>>,
}

/// `A..B`, both ends included.
#[derive(Clone, Debug)]
pub struct LabelRange {
    /// First label.
    pub first: i64,
    /// Last label.
    pub last: i64,
    /// Its place.
    pub span: Span,
}

/// `table NAME [per GROUPS] [from "FILE"] { COLUMNS }`.
#[derive(Clone, Debug)]
pub struct TableDeclaration {
    /// The table's name.
    pub name: Name,
    /// The groups behind `per`: one row for each combination of their labels.
    pub per: Vec<Name>,
    /// The default file.
    pub file: Option<Quoted>,
    /// The columns in order.
    pub columns: Vec<ColumnDeclaration>,
}

/// `NAME [: TYPE] [in "UNIT"] [from "HEADING"] [with gaps] [between A and B]`.
#[derive(Clone, Debug)]
pub struct ColumnDeclaration {
    /// The whole column.
    pub span: Span,
    /// The column's name; where no type stands, also the group's.
    pub name: Name,
    /// The type or, for a role, the group behind the colon.
    pub kind: Option<TypeClause>,
    /// The heading in the file.
    pub heading: Option<Quoted>,
    /// The words `with gaps`.
    pub gaps: Option<Span>,
    /// `between A and B`: checked when the data are read.
    pub between: Option<(Id<Expression>, Id<Expression>)>,
}

/// A support type with its shape and unit: `real per hive over piece in "kg"`.
#[derive(Clone, Debug)]
pub struct TypeClause {
    /// The whole clause.
    pub span: Span,
    /// The support type.
    pub support: SupportSyntax,
    /// The index sets behind `per`.
    pub per: Vec<Name>,
    /// The group behind `over`: its labels are drawn together.
    pub over: Option<Name>,
    /// The unit behind `in`.
    pub unit: Option<Quoted>,
}

/// A support type as written.
#[derive(Clone, Debug)]
pub struct SupportSyntax {
    /// Its place.
    pub span: Span,
    /// Which it is.
    pub kind: SupportKind,
}

/// The support types of the notation.
#[derive(Clone, Debug)]
pub enum SupportKind {
    /// A bare word: `real`, `positive`, `fraction`, `count`, `yesno`, or, in a table, a group's name (a role).
    Word(Name),
    /// `real above a`, `real below b`, `real between a and b`; the word before the bounds is kept for the checker.
    Bounded {
        /// The word before the bounds.
        word: Name,
        /// Lower end.
        low: Option<Id<Expression>>,
        /// Upper end.
        high: Option<Id<Expression>>,
    },
    /// `shares over G`, `covariance over G`, `correlation over G`.
    Over {
        /// The word before `over`.
        word: Name,
        /// The group.
        group: Name,
    },
    /// `one of G`.
    OneOf(Name),
}

/// `given NAME : TYPE = EXPRESSION`.
#[derive(Clone, Debug)]
pub struct GivenDeclaration {
    /// The setting's name.
    pub name: Name,
    /// Its type and unit.
    pub kind: TypeClause,
    /// Its default.
    pub default: Id<Expression>,
}

/// `unknown NAME : TYPE follows DISTRIBUTION ...`.
#[derive(Clone, Debug)]
pub struct UnknownDeclaration {
    /// The unknown's name.
    pub name: Name,
    /// Its support, shape and unit.
    pub kind: TypeClause,
    /// Its prior; `None` where `follows` is missing, for the checker to report.
    pub prior: Option<DistributionSyntax>,
    /// `holding "LABEL" at VALUE`.
    pub holding: Option<Holding>,
    /// `starting DISTRIBUTION`, for a recursion.
    pub starting: Option<DistributionSyntax>,
    /// `by RULE`.
    pub demand: Option<Name>,
}

/// `holding "LABEL" at VALUE`.
#[derive(Clone, Debug)]
pub struct Holding {
    /// The clause.
    pub span: Span,
    /// The label that is held.
    pub label: Quoted,
    /// The value that it is held at.
    pub value: Id<Expression>,
}

/// A distribution with its modifiers.
#[derive(Clone, Debug)]
pub struct DistributionSyntax {
    /// The distribution and its modifiers.
    pub span: Span,
    /// The call: `normal(mean: m, sd: s)`. Any expression parses here; the checker asks for a call.
    pub call: Id<Expression>,
    /// The modifiers in order.
    pub modifiers: Vec<Modifier>,
}

/// A modifier of a distribution and its place.
#[derive(Clone, Debug)]
pub struct Modifier {
    /// Its place.
    pub span: Span,
    /// What it does.
    pub kind: ModifierKind,
}

/// What a modifier does.
#[derive(Clone, Debug)]
pub enum ModifierKind {
    /// `between a and b`.
    Between(Id<Expression>, Id<Expression>),
    /// `above a`.
    Above(Id<Expression>),
    /// `below b`.
    Below(Id<Expression>),
    /// `censored below c when flag`.
    CensoredBelow(Id<Expression>, Id<Expression>),
    /// `censored above c when flag`.
    CensoredAbove(Id<Expression>, Id<Expression>),
    /// `known between a and b`.
    KnownBetween(Id<Expression>, Id<Expression>),
}

/// `term NAME = E`, `let NAME = E`, `derive NAME = E`.
#[derive(Clone, Debug)]
pub struct ExpressionDeclaration {
    /// The name.
    pub name: Name,
    /// What it stands for.
    pub value: Id<Expression>,
}

/// `response NAME [over G] follows DISTRIBUTION [by RULE]`.
#[derive(Clone, Debug)]
pub struct ResponseDeclaration {
    /// The column's name.
    pub column: Name,
    /// The group behind `over`.
    pub over: Option<Name>,
    /// How it arises; `None` where `follows` is missing.
    pub law: Option<DistributionSyntax>,
}

/// `part NAME(PARAMETERS) : TYPE { DECLARATIONS give EXPRESSION }`.
#[derive(Clone, Debug)]
pub struct PartDeclaration {
    /// The part's name.
    pub name: Name,
    /// Its parameters.
    pub parameters: Vec<PartParameter>,
    /// The type of what it gives.
    pub gives_type: Option<TypeClause>,
    /// Its own declarations.
    pub body: Vec<Declaration>,
    /// What it gives.
    pub gives: Option<Id<Expression>>,
}

/// A parameter of a part.
#[derive(Clone, Debug)]
pub enum PartParameter {
    /// `per g`.
    Group(Name),
    /// `typical : positive [= default]`.
    Value {
        /// Its name.
        name: Name,
        /// Its type.
        kind: Box<TypeClause>,
        /// Its default.
        default: Option<Id<Expression>>,
    },
}

/// `ladder { rung ... }`.
#[derive(Clone, Debug)]
pub struct LadderDeclaration {
    /// The rungs in order.
    pub rungs: Vec<RungSyntax>,
}

/// `rung NAME [from NAME] [adds TERMS]`.
#[derive(Clone, Debug)]
pub struct RungSyntax {
    /// The whole rung.
    pub span: Span,
    /// Its name.
    pub name: Name,
    /// The rung that it starts from.
    pub from: Option<Name>,
    /// The terms that it adds.
    pub adds: Vec<Name>,
}

/// `use "FILE" [as NAME]`.
#[derive(Clone, Debug)]
pub struct UseDeclaration {
    /// The file.
    pub file: Quoted,
    /// The name that its declarations are read under.
    pub alias: Option<Name>,
}

/// An expression and where it stands.
#[derive(Clone, Debug)]
pub struct Expression {
    /// Its place.
    pub span: Span,
    /// What it is.
    pub kind: ExpressionKind,
}

/// What an expression is.
#[derive(Clone, Debug)]
pub enum ExpressionKind {
    /// A number.
    Number(f64),
    /// A quoted label.
    Text(String),
    /// A name.
    Name(Name),
    /// `base[selectors]`.
    Select {
        /// What is indexed.
        base: Id<Expression>,
        /// One selector for each index, or one role.
        selectors: Vec<Selector>,
    },
    /// `base.name`.
    Member {
        /// The instance.
        base: Id<Expression>,
        /// The unknown inside.
        name: Name,
    },
    /// `-e`, `not e`.
    Unary(UnaryOperator, Id<Expression>),
    /// `a + b` and so on.
    Binary(BinaryOperator, Id<Expression>, Id<Expression>),
    /// `if c then a else b`.
    If {
        /// The condition.
        condition: Id<Expression>,
        /// Its value where the condition holds.
        then: Id<Expression>,
        /// Its value elsewhere.
        otherwise: Id<Expression>,
    },
    /// `name(arguments)`: a function, a distribution or a part; the checker tells which.
    Call {
        /// What is called.
        name: Name,
        /// Its arguments in order.
        arguments: Vec<Argument>,
    },
    /// `sum(e over G per H)`.
    Reduce {
        /// `sum`, `mean`, `sd`, `min`, `max`, `count`, or whatever stood there.
        name: Name,
        /// What is reduced.
        body: Id<Expression>,
        /// The group or table that it runs over.
        over: Name,
        /// The groups behind `per`.
        per: Vec<Name>,
    },
}

/// A selector between brackets.
#[derive(Clone, Debug)]
pub enum Selector {
    /// `x["2019"]`.
    Label(Quoted),
    /// `x[dam]`.
    Role(Name),
    /// `x[previous season]`.
    Previous(Name),
    /// `x[next season]`.
    Next(Name),
}

/// An argument of a call.
#[derive(Clone, Debug)]
pub enum Argument {
    /// `sd: s`.
    Named(Name, Id<Expression>),
    /// `s` alone.
    Positional(Id<Expression>),
    /// `per season`.
    Group(Name),
}

/// Operators before an expression.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum UnaryOperator {
    /// `-`
    Negate,
    /// `not`
    Not,
}

/// Operators between expressions.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum BinaryOperator {
    /// `+`
    Add,
    /// `-`
    Subtract,
    /// `*`
    Multiply,
    /// `/`
    Divide,
    /// `^`
    Power,
    /// `==`
    Equal,
    /// `!=`
    NotEqual,
    /// `<`
    Less,
    /// `<=`
    LessOrEqual,
    /// `>`
    Greater,
    /// `>=`
    GreaterOrEqual,
    /// `and`
    And,
    /// `or`
    Or,
}
