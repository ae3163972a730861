//! Text to tokens.

use logos::Logos;

use crate::problem::{Problems, SyntaxProblem};
use crate::span::{FileId, Span};

/// What a token is.
#[derive(Logos, Clone, Copy, Debug, PartialEq, Eq, Hash)]
#[logos(skip r"[ \t\r\n\f]+")]
pub(crate) enum Token {
    /// `## ...`
    #[regex(r"##[^\n]*", priority = 20, allow_greedy = true)]
    Documentation,
    /// `# ...`
    #[regex(r"#[^\n]*", priority = 10, allow_greedy = true)]
    Comment,
    /// A name or a reserved word.
    #[regex(r"[\p{XID_Start}_][\p{XID_Continue}]*")]
    Word,
    /// `12`, `1.5`, `1e-3`.
    #[regex(r"[0-9]+(\.[0-9]+)?([eE][+-]?[0-9]+)?")]
    Number,
    /// `"..."`, with `\"` and `\\`.
    #[regex(r#""([^"\\\n]|\\.)*""#)]
    Text,
    /// A quote that is not closed on its line.
    #[regex(r#""([^"\\\n]|\\.)*"#, priority = 1)]
    OpenText,
    /// `..`
    #[token("..")]
    Range,
    /// `.`
    #[token(".")]
    Dot,
    /// `,`
    #[token(",")]
    Comma,
    /// `:`
    #[token(":")]
    Colon,
    /// `;`
    #[token(";")]
    Semicolon,
    /// `(`
    #[token("(")]
    OpenParenthesis,
    /// `)`
    #[token(")")]
    CloseParenthesis,
    /// `[`
    #[token("[")]
    OpenBracket,
    /// `]`
    #[token("]")]
    CloseBracket,
    /// `{`
    #[token("{")]
    OpenBrace,
    /// `}`
    #[token("}")]
    CloseBrace,
    /// `+`
    #[token("+")]
    Plus,
    /// `-`
    #[token("-")]
    Minus,
    /// `*`
    #[token("*")]
    Star,
    /// `/`
    #[token("/")]
    Slash,
    /// `^`
    #[token("^")]
    Caret,
    /// `==`
    #[token("==")]
    EqualEqual,
    /// `=`
    #[token("=")]
    Equal,
    /// `!=`
    #[token("!=")]
    NotEqual,
    /// `<=`
    #[token("<=")]
    LessEqual,
    /// `<`
    #[token("<")]
    Less,
    /// `>=`
    #[token(">=")]
    GreaterEqual,
    /// `>`
    #[token(">")]
    Greater,
    /// `~` and `<-`, which other notations use where this one says `follows`.
    #[token("~")]
    #[token("<-")]
    Tilde,
    /// The end of the text.
    End,
}

/// A token with its place.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) struct Spanned {
    /// What it is.
    pub token: Token,
    /// Its place.
    pub span: Span,
}

/// Words that begin a declaration at the outermost level.
pub(crate) const DECLARATIONS: [&str; 11] =
    ["group", "table", "given", "unknown", "term", "let", "response", "derive", "part", "ladder", "use"];

/// All words that cannot be names.
pub(crate) const RESERVED: [&str; 38] = [
    "group", "table", "given", "unknown", "term", "let", "response", "derive", "part", "ladder", "use",
    "rung", "give", "within", "ordered", "per", "in", "with", "gaps", "between", "and", "or", "not", "above",
    "below", "follows", "over", "by", "holding", "at", "starting", "adds", "from", "if", "then", "else",
    "when", "as",
];

/// The tokens of a text, comments left out, an [`Token::End`] last. Never fails: what is no token is a problem.
pub(crate) fn tokens(text: &str, file: FileId) -> (Vec<Spanned>, Problems) {
    let mut problems = Problems::default();
    let mut list = vec![];
    for (found, range) in Token::lexer(text).spanned() {
        let span = Span::new(file, range.start, range.end);
        match found {
            Ok(Token::Comment) => {}
            Ok(Token::OpenText) => {
                problems
                    .add(SyntaxProblem::UnclosedText { span: Span::new(file, range.start, range.start + 1) });
                list.push(Spanned { token: Token::Text, span });
            }
            Ok(token) => list.push(Spanned { token, span }),
            Err(()) => {
                let character = text[range.start..].chars().next().unwrap_or('?');
                let span = Span::new(file, range.start, range.start + character.len_utf8());
                problems.add(SyntaxProblem::StrayCharacter { span, character });
            }
        }
    }
    list.push(Spanned { token: Token::End, span: Span::new(file, text.len(), text.len()) });
    (list, problems)
}

impl Token {
    /// The token as it is written, for those that are always written alike.
    pub(crate) fn written(self) -> &'static str {
        match self {
            Token::Documentation => "a `##` comment",
            Token::Comment => "a comment",
            Token::Word => "a name",
            Token::Number => "a number",
            Token::Text | Token::OpenText => "a quoted text",
            Token::Range => "`..`",
            Token::Dot => "`.`",
            Token::Comma => "`,`",
            Token::Colon => "`:`",
            Token::Semicolon => "`;`",
            Token::OpenParenthesis => "`(`",
            Token::CloseParenthesis => "`)`",
            Token::OpenBracket => "`[`",
            Token::CloseBracket => "`]`",
            Token::OpenBrace => "`{`",
            Token::CloseBrace => "`}`",
            Token::Plus => "`+`",
            Token::Minus => "`-`",
            Token::Star => "`*`",
            Token::Slash => "`/`",
            Token::Caret => "`^`",
            Token::EqualEqual => "`==`",
            Token::Equal => "`=`",
            Token::NotEqual => "`!=`",
            Token::LessEqual => "`<=`",
            Token::Less => "`<`",
            Token::GreaterEqual => "`>=`",
            Token::Greater => "`>`",
            Token::Tilde => "`~`",
            Token::End => "the end of the text",
        }
    }
}
