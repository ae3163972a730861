//! Tokens to a syntax tree, by recursive descent.
//!
//! A declaration begins with a reserved word, so a declaration with a mistake ends where the next one begins, and hides
//! nothing of it; the same holds for columns, rungs and the declarations inside a part.

mod cursor;
mod declaration;
mod distribution;
mod expression;
mod ladder;
mod table;

use crate::problem::{Problems, SyntaxProblem};
use crate::span::FileId;
use crate::syntax::token::{self, DECLARATIONS, Token};
use crate::syntax::tree::{Declaration, Tree};

use cursor::Cursor;

/// Reads a text. Never fails: what could not be read is left out of the tree and is among the problems.
pub fn parse(text: &str, file: FileId) -> (Tree, Problems) {
    let (tokens, mut problems) = token::tokens(text, file);
    let mut cursor = Cursor::new(text, &tokens);
    let declarations = cursor.declarations(false);
    cursor.tree.declarations = declarations;
    problems.extend(cursor.problems);
    (cursor.tree, problems)
}

impl Cursor<'_> {
    /// Declarations up to the end of the text, or inside a part up to its brace or `give`.
    fn declarations(&mut self, inside_part: bool) -> Vec<Declaration> {
        let mut list = vec![];
        loop {
            let documentation = self.documentation();
            if self.token() == Token::End {
                return list;
            }
            if inside_part && (self.token() == Token::CloseBrace || self.is_word("give")) {
                return list;
            }
            if !DECLARATIONS.contains(&self.word()) {
                self.not_a_declaration();
                self.skip_to_declaration();
                continue;
            }
            let start = self.span();
            let named = (self.peek(1) == Token::Word).then(|| self.slice(self.peek_span(1)).to_string());
            match self.declaration() {
                Ok(kind) => {
                    let span = start.to(self.before());
                    list.push(Declaration { span, documentation, kind });
                    if !self.at_declaration()
                        && !(inside_part && (self.token() == Token::CloseBrace || self.is_word("give")))
                    {
                        self.left_over();
                        self.skip_to_declaration();
                    }
                }
                Err(_) => {
                    self.tree.lost.extend(named);
                    // At least one token on, so that a word that is stuck at itself does not stop everything.
                    if self.span() == start {
                        self.advance();
                    }
                    self.skip_to_declaration();
                }
            }
        }
    }

    fn documentation(&mut self) -> Option<String> {
        let mut lines = vec![];
        while self.token() == Token::Documentation {
            let span = self.advance();
            lines.push(self.slice(span).trim_start_matches('#').trim().to_string());
        }
        (!lines.is_empty()).then(|| lines.join("\n"))
    }

    fn not_a_declaration(&mut self) {
        let span = self.span();
        let found = self.slice(span).to_string();
        let problem = if self.token() == Token::Word {
            if found == "for" {
                SyntaxProblem::Loop { span }
            } else {
                let nearest = crate::nearest::nearest(&found, DECLARATIONS);
                if self.peek(1) == Token::Word {
                    self.tree.lost.push(self.slice(self.peek_span(1)).to_string());
                }
                SyntaxProblem::NoDeclaration { span, found, nearest }
            }
        } else if self.token() == Token::CloseBrace {
            SyntaxProblem::StrayClose { span }
        } else {
            SyntaxProblem::NoDeclaration { span, found, nearest: None }
        };
        self.problems.add(problem);
    }

    /// What stands behind a declaration that was complete.
    fn left_over(&mut self) {
        let span = self.span();
        let found = self.slice(span).to_string();
        let nearest = match self.token() {
            Token::Word => crate::nearest::nearest(&found, DECLARATIONS),
            _ => None,
        };
        let problem = match self.token() {
            Token::Tilde => SyntaxProblem::NotFollows { span },
            Token::Semicolon => SyntaxProblem::Semicolon { span },
            Token::CloseBrace | Token::CloseParenthesis | Token::CloseBracket => {
                SyntaxProblem::StrayClose { span }
            }
            Token::Comma if self.peek(1) == Token::Number => SyntaxProblem::DecimalComma { span },
            _ if found == "for" => SyntaxProblem::Loop { span },
            Token::Word if nearest.is_some() && self.peek(1) == Token::Word => {
                // A declaration whose word is misspelt: its name counts as declared.
                self.tree.lost.push(self.slice(self.peek_span(1)).to_string());
                SyntaxProblem::NoDeclaration { span, found, nearest }
            }
            _ => SyntaxProblem::LeftOver { span, found, nearest },
        };
        self.problems.add(problem);
    }
}
