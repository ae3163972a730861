//! The ladder and its rungs.

use super::cursor::{Cursor, Read};
use crate::syntax::token::Token;
use crate::syntax::tree::{LadderDeclaration, RungSyntax};

impl Cursor<'_> {
    /// A ladder, behind its word.
    pub(super) fn ladder(&mut self) -> Read<LadderDeclaration> {
        let open = self.expect(Token::OpenBrace, "after `ladder`")?;
        let mut rungs = vec![];
        while self.token() != Token::CloseBrace && !self.at_ladder_end() {
            match self.rung() {
                Ok(rung) => rungs.push(rung),
                Err(_) => self.skip_to_rung(),
            }
        }
        self.close(Token::CloseBrace, open)?;
        Ok(LadderDeclaration { rungs })
    }

    fn at_ladder_end(&mut self) -> bool {
        while self.token() == Token::Documentation {
            self.advance();
        }
        self.at_declaration()
    }

    fn skip_to_rung(&mut self) {
        while !(self.token() == Token::CloseBrace || self.is_word("rung") || self.at_declaration()) {
            self.advance();
        }
    }

    fn rung(&mut self) -> Read<RungSyntax> {
        let start = self.expect_word("rung", "in a ladder")?;
        let name = self.name("after `rung`")?;
        let mut rung = RungSyntax { span: start, name, from: None, adds: vec![] };
        loop {
            if self.take_word("from").is_some() {
                rung.from = Some(self.name("after `from`: an earlier rung")?);
            } else if self.take_word("adds").is_some() {
                rung.adds = self.names("after `adds`: a term")?;
            } else {
                rung.span = start.to(self.before());
                return Ok(rung);
            }
        }
    }
}
