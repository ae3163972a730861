//! A place in the tokens, and what may stand there.

use crate::problem::{Problems, SyntaxProblem};
use crate::span::Span;
use crate::syntax::token::{DECLARATIONS, RESERVED, Spanned, Token};
use crate::syntax::tree::{Name, Quoted, Tree};

/// A declaration, column or the like that could not be read further; its problem has been noted.
pub(super) struct Stuck;

/// What reading a part gives.
pub(super) type Read<T> = Result<T, Stuck>;

/// The reader of one text.
pub(super) struct Cursor<'a> {
    pub(super) text: &'a str,
    tokens: &'a [Spanned],
    at: usize,
    pub(super) tree: Tree,
    pub(super) problems: Problems,
    /// How deep expressions are nested at the moment.
    pub(super) depth: usize,
}

impl<'a> Cursor<'a> {
    pub(super) fn new(text: &'a str, tokens: &'a [Spanned]) -> Cursor<'a> {
        Cursor { text, tokens, at: 0, tree: Tree::default(), problems: Problems::default(), depth: 0 }
    }

    pub(super) fn token(&self) -> Token {
        self.tokens[self.at].token
    }

    pub(super) fn span(&self) -> Span {
        self.tokens[self.at].span
    }

    /// The place of the token before.
    pub(super) fn before(&self) -> Span {
        self.tokens[self.at.saturating_sub(1)].span
    }

    pub(super) fn peek(&self, ahead: usize) -> Token {
        self.tokens[(self.at + ahead).min(self.tokens.len() - 1)].token
    }

    pub(super) fn peek_span(&self, ahead: usize) -> Span {
        self.tokens[(self.at + ahead).min(self.tokens.len() - 1)].span
    }

    pub(super) fn advance(&mut self) -> Span {
        let span = self.span();
        self.at = (self.at + 1).min(self.tokens.len() - 1);
        span
    }

    pub(super) fn slice(&self, span: Span) -> &'a str {
        &self.text[span.start as usize..span.end as usize]
    }

    /// The word at hand; empty where there is none.
    pub(super) fn word(&self) -> &'a str {
        if self.token() == Token::Word { self.slice(self.span()) } else { "" }
    }

    pub(super) fn is_word(&self, word: &str) -> bool {
        self.word() == word
    }

    /// Takes a word if it is at hand.
    pub(super) fn take_word(&mut self, word: &str) -> Option<Span> {
        self.is_word(word).then(|| self.advance())
    }

    pub(super) fn take(&mut self, token: Token) -> Option<Span> {
        (self.token() == token).then(|| self.advance())
    }

    /// Whether a declaration begins here, or the text ends.
    pub(super) fn at_declaration(&self) -> bool {
        self.token() == Token::End
            || self.token() == Token::Documentation
            || DECLARATIONS.contains(&self.word())
    }

    /// Moves on to where a declaration begins.
    pub(super) fn skip_to_declaration(&mut self) {
        while !self.at_declaration() {
            self.advance();
        }
    }

    /// Asks for a token.
    pub(super) fn expect(&mut self, token: Token, context: &'static str) -> Read<Span> {
        match self.take(token) {
            Some(span) => Ok(span),
            None => self.wrong(token.written(), context),
        }
    }

    /// Asks for a word.
    pub(super) fn expect_word(&mut self, word: &'static str, context: &'static str) -> Read<Span> {
        match self.take_word(word) {
            Some(span) => Ok(span),
            None => self.wrong(word, context),
        }
    }

    /// Asks for a name that is not reserved.
    pub(super) fn name(&mut self, context: &'static str) -> Read<Name> {
        if self.token() != Token::Word {
            return self.wrong("a name", context);
        }
        if RESERVED.contains(&self.word()) {
            if DECLARATIONS.contains(&self.word()) && self.starts_line() {
                return self.wrong("a name", context);
            }
            let span = self.advance();
            self.problems.add(SyntaxProblem::ReservedWord { span, word: self.slice(span).into(), context });
            return Ok(Name { text: self.slice(span).to_string(), span });
        }
        let span = self.advance();
        Ok(Name { text: self.slice(span).to_string(), span })
    }

    /// Whether the token at hand is the first of its line.
    fn starts_line(&self) -> bool {
        let before = &self.text[..self.span().start as usize];
        before.rsplit('\n').next().is_none_or(|line| line.trim().is_empty())
    }

    /// Names separated by commas.
    pub(super) fn names(&mut self, context: &'static str) -> Read<Vec<Name>> {
        let mut names = vec![self.name(context)?];
        // Behind a comma a name with a colon, or another `per`, begins the next parameter.
        let next_parameter = |cursor: &Self| {
            cursor.peek(1) == Token::Word
                && (cursor.peek(2) == Token::Colon || cursor.slice(cursor.peek_span(1)) == "per")
        };
        while self.token() == Token::Comma && !next_parameter(self) {
            self.advance();
            names.push(self.name(context)?);
        }
        Ok(names)
    }

    /// Asks for a quoted text.
    pub(super) fn quoted(&mut self, context: &'static str) -> Read<Quoted> {
        if self.token() != Token::Text {
            return self.wrong("a text between quotes", context);
        }
        let span = self.advance();
        Ok(Quoted { text: unquoted(self.slice(span)), span })
    }

    /// Notes that something else stands here than what may.
    pub(super) fn wrong<T>(&mut self, wanted: &'static str, context: &'static str) -> Read<T> {
        let span = self.span();
        let found = match self.token() {
            Token::Word => format!("`{}`", self.slice(span)),
            Token::Number => format!("the number {}", self.slice(span)),
            Token::Text => format!("the text {}", self.slice(span)),
            other => other.written().to_string(),
        };
        let after = self.before();
        let problem = match self.token() {
            Token::Tilde => SyntaxProblem::NotFollows { span },
            Token::Semicolon => SyntaxProblem::Semicolon { span },
            _ => SyntaxProblem::Unexpected { span, found, wanted, context, after },
        };
        self.problems.add(problem);
        Err(Stuck)
    }
}

/// The text between quotes, escapes undone.
fn unquoted(written: &str) -> String {
    let inner = written.strip_prefix('"').unwrap_or(written);
    let inner = inner.strip_suffix('"').unwrap_or(inner);
    let mut text = String::with_capacity(inner.len());
    let mut characters = inner.chars();
    while let Some(character) = characters.next() {
        match character {
            '\\' => text.extend(characters.next()),
            other => text.push(other),
        }
    }
    text
}
