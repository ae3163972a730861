//! Tables and their columns.

use super::cursor::{Cursor, Read};
use crate::syntax::token::Token;
use crate::syntax::tree::{ColumnDeclaration, TableDeclaration};

impl Cursor<'_> {
    /// A table, behind its word.
    pub(super) fn table(&mut self) -> Read<TableDeclaration> {
        let name = self.name("after `table`")?;
        let mut per = vec![];
        let mut file = None;
        loop {
            if self.take_word("per").is_some() {
                per.extend(self.names("after `per`")?);
            } else if self.take_word("from").is_some() {
                file = Some(self.quoted("after `from`: a file")?);
            } else {
                break;
            }
        }
        let open = self.expect(Token::OpenBrace, "before the columns of a table")?;
        let mut columns = vec![];
        loop {
            while matches!(self.token(), Token::Comma | Token::Documentation) {
                self.advance();
            }
            if self.token() == Token::CloseBrace || self.at_declaration() {
                break;
            }
            let start = self.span();
            match self.column() {
                Ok(column) => columns.push(column),
                Err(_) => self.skip_to_column(start),
            }
        }
        self.close(Token::CloseBrace, open)?;
        Ok(TableDeclaration { name, per, file, columns })
    }

    /// On to what can begin a column: a name behind a comma or at the start of a line.
    fn skip_to_column(&mut self, start: crate::span::Span) {
        if self.span() == start {
            self.advance();
        }
        while !(matches!(self.token(), Token::CloseBrace | Token::Comma) || self.at_declaration()) {
            let gap = self.before().end as usize..self.span().start as usize;
            if self.token() == Token::Word && self.text[gap].contains('\n') {
                return;
            }
            self.advance();
        }
    }

    fn column(&mut self) -> Read<ColumnDeclaration> {
        let name = self.name("as a column of a table")?;
        let start = name.span;
        let mut column =
            ColumnDeclaration { span: start, name, kind: None, heading: None, gaps: None, between: None };
        if self.take(Token::Colon).is_some() {
            column.kind = Some(self.type_clause()?);
        }
        loop {
            if self.take_word("from").is_some() {
                column.heading = Some(self.quoted("after `from`: a heading")?);
            } else if let Some(span) = self.take_word("with") {
                let gaps = self.expect_word("gaps", "after `with`")?;
                column.gaps = Some(span.to(gaps));
            } else if self.take_word("between").is_some() {
                let low = self.end("after `between`")?;
                self.expect_word("and", "between the ends of `between`")?;
                column.between = Some((low, self.end("after `and`")?));
            } else if self.take_word("in").is_some() {
                let unit = self.quoted("after `in`: a unit")?;
                if let Some(kind) = &mut column.kind {
                    kind.unit = Some(unit);
                }
            } else {
                column.span = start.to(self.before());
                return Ok(column);
            }
        }
    }
}
