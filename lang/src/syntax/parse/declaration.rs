//! Declarations, except tables and ladders.

use super::cursor::{Cursor, Read};
use crate::problem::SyntaxProblem;
use crate::syntax::token::Token;
use crate::syntax::tree::{
    DeclarationKind, ExpressionDeclaration, GivenDeclaration, GroupDeclaration, Holding, LabelRange,
    PartDeclaration, PartParameter, Quoted, ResponseDeclaration, SupportKind, SupportSyntax, TypeClause,
    UnknownDeclaration, UseDeclaration,
};

impl Cursor<'_> {
    /// The declaration that begins at the reserved word at hand.
    pub(super) fn declaration(&mut self) -> Read<DeclarationKind> {
        let word = self.word();
        self.advance();
        match word {
            "group" => self.group().map(DeclarationKind::Group),
            "table" => self.table().map(DeclarationKind::Table),
            "given" => self.given().map(DeclarationKind::Given),
            "unknown" => self.unknown().map(DeclarationKind::Unknown),
            "term" => self.named("after the name of a term").map(DeclarationKind::Term),
            "let" => self.named("after the name of a let").map(DeclarationKind::Let),
            "response" => self.response().map(DeclarationKind::Response),
            "derive" => self.named("after the name of a derived quantity").map(DeclarationKind::Derive),
            "part" => self.part().map(DeclarationKind::Part),
            "ladder" => self.ladder().map(DeclarationKind::Ladder),
            _ => self.uses().map(DeclarationKind::Use),
        }
    }

    fn group(&mut self) -> Read<GroupDeclaration> {
        let name = self.name("after `group`")?;
        let mut group = GroupDeclaration { name, within: None, ordered: None, range: None, labels: None };
        loop {
            if self.take_word("within").is_some() {
                group.within = Some(self.name("after `within`")?);
            } else if let Some(span) = self.take_word("ordered") {
                group.ordered = Some(span);
                if matches!(self.token(), Token::Number | Token::Minus) {
                    group.range = Some(self.label_range()?);
                }
            } else if self.token() == Token::OpenBrace {
                group.labels = Some(self.closed_labels()?);
            } else {
                return Ok(group);
            }
        }
    }

    fn label_range(&mut self) -> Read<LabelRange> {
        let (first, start) = self.whole_number("as the first label of a range")?;
        self.expect(Token::Range, "between the ends of a range: `2010..2024`")?;
        let (last, end) = self.whole_number("as the last label of a range")?;
        Ok(LabelRange { first, last, span: start.to(end) })
    }

    fn whole_number(&mut self, context: &'static str) -> Read<(i64, crate::span::Span)> {
        let minus = self.take(Token::Minus);
        if self.token() != Token::Number {
            return self.wrong("a whole number", context);
        }
        let Ok(value) = self.slice(self.span()).parse::<i64>() else {
            return self.wrong("a whole number", context);
        };
        let span = self.advance();
        Ok(match minus {
            Some(minus) => (-value, minus.to(span)),
            None => (value, span),
        })
    }

    fn closed_labels(&mut self) -> Read<Vec<Quoted>> {
        let open = self.advance();
        let mut labels = vec![];
        while self.token() != Token::CloseBrace {
            let span = self.span();
            match self.token() {
                Token::Text => labels.push(self.quoted("as a label")?),
                Token::Word | Token::Number => {
                    self.advance();
                    labels.push(Quoted { text: self.slice(span).to_string(), span });
                }
                _ => return self.wrong("a label", "in the labels of a group"),
            }
            if self.take(Token::Comma).is_none() {
                break;
            }
        }
        self.close(Token::CloseBrace, open)?;
        Ok(labels)
    }

    fn given(&mut self) -> Read<GivenDeclaration> {
        let name = self.name("after `given`")?;
        let kind = self.type_of("after the name of a given")?;
        self.expect(Token::Equal, "behind the type of a given: it needs a default")?;
        let default = self.expression("as the default of a given")?;
        Ok(GivenDeclaration { name, kind, default })
    }

    /// `: TYPE`.
    pub(super) fn type_of(&mut self, context: &'static str) -> Read<TypeClause> {
        self.expect(Token::Colon, context)?;
        self.type_clause()
    }

    /// A support type with `per`, `over` and `in` in any order.
    pub(super) fn type_clause(&mut self) -> Read<TypeClause> {
        let support = self.support()?;
        let mut kind = TypeClause { span: support.span, support, per: vec![], over: None, unit: None };
        loop {
            if self.take_word("per").is_some() {
                kind.per.extend(self.names("after `per`")?);
            } else if self.take_word("over").is_some() {
                kind.over = Some(self.name("after `over`")?);
            } else if self.take_word("in").is_some() {
                kind.unit = Some(self.quoted("after `in`: a unit")?);
            } else {
                kind.span = kind.span.to(self.before());
                return Ok(kind);
            }
        }
    }

    fn support(&mut self) -> Read<SupportSyntax> {
        let word = self.name("as a type: real, positive, fraction, count or yesno")?;
        let start = word.span;
        let matrix = matches!(word.text.as_str(), "shares" | "covariance" | "correlation");
        let kind = if word.text == "one" && self.is_word("of") {
            self.advance();
            SupportKind::OneOf(self.name("after `one of`")?)
        } else if matrix && self.take_word("over").is_some() {
            SupportKind::Over { word, group: self.name("after `over`")? }
        } else if self.take_word("above").is_some() {
            SupportKind::Bounded { word, low: Some(self.end("after `above`")?), high: None }
        } else if self.take_word("below").is_some() {
            SupportKind::Bounded { word, low: None, high: Some(self.end("after `below`")?) }
        } else if self.take_word("between").is_some() {
            let low = self.end("after `between`")?;
            self.expect_word("and", "between the ends of `between`")?;
            let high = self.end("after `and`")?;
            SupportKind::Bounded { word, low: Some(low), high: Some(high) }
        } else {
            SupportKind::Word(word)
        };
        Ok(SupportSyntax { span: start.to(self.before()), kind })
    }

    fn unknown(&mut self) -> Read<UnknownDeclaration> {
        let name = self.name("after `unknown`")?;
        let kind = self.type_of("after the name of an unknown: its type")?;
        let mut unknown =
            UnknownDeclaration { name, kind, prior: None, holding: None, starting: None, demand: None };
        if let Some(span) = self.take(Token::Tilde) {
            self.problems.add(SyntaxProblem::NotFollows { span });
            unknown.prior = Some(self.distribution()?);
        } else if self.take_word("follows").is_some() {
            unknown.prior = Some(self.distribution()?);
        }
        loop {
            if let Some(start) = self.take_word("holding") {
                let label = self.quoted("after `holding`: a label")?;
                self.expect_word("at", "after the label of `holding`")?;
                let value = self.end("after `at`")?;
                unknown.holding = Some(Holding { span: start.to(self.before()), label, value });
            } else if self.take_word("starting").is_some() {
                unknown.starting = Some(self.distribution()?);
            } else if self.take_word("by").is_some() {
                unknown.demand = Some(self.name("after `by`: conjugate, slice, joint or enumerate")?);
            } else {
                return Ok(unknown);
            }
        }
    }

    fn named(&mut self, context: &'static str) -> Read<ExpressionDeclaration> {
        let name = self.name("as the name of a declaration")?;
        if self.token() == Token::EqualEqual {
            self.problems.add(SyntaxProblem::EqualEqual { span: self.span() });
            self.advance();
        } else {
            self.expect(Token::Equal, context)?;
        }
        let value = self.expression("after `=`")?;
        Ok(ExpressionDeclaration { name, value })
    }

    fn response(&mut self) -> Read<ResponseDeclaration> {
        let column = self.name("after `response`: a column")?;
        let over = match self.take_word("over") {
            Some(_) => Some(self.name("after `over`")?),
            None => None,
        };
        let mut response = ResponseDeclaration { column, over, law: None };
        if let Some(span) = self.take(Token::Tilde) {
            self.problems.add(SyntaxProblem::NotFollows { span });
            response.law = Some(self.distribution()?);
        } else if self.take_word("follows").is_some() {
            response.law = Some(self.distribution()?);
        }
        Ok(response)
    }

    fn part(&mut self) -> Read<PartDeclaration> {
        let name = self.name("after `part`")?;
        let open = self.expect(Token::OpenParenthesis, "after the name of a part")?;
        let mut parameters = vec![];
        while self.token() != Token::CloseParenthesis {
            parameters.push(self.part_parameter()?);
            if self.take(Token::Comma).is_none() {
                break;
            }
        }
        self.close(Token::CloseParenthesis, open)?;
        let gives_type = match self.take(Token::Colon) {
            Some(_) => Some(self.type_clause()?),
            None => None,
        };
        let open = self.expect(Token::OpenBrace, "before the declarations of a part")?;
        let body = self.declarations(true);
        let gives = match self.take_word("give") {
            Some(_) => Some(self.expression("after `give`")?),
            None => None,
        };
        self.close(Token::CloseBrace, open)?;
        Ok(PartDeclaration { name, parameters, gives_type, body, gives })
    }

    fn part_parameter(&mut self) -> Read<PartParameter> {
        if self.take_word("per").is_some() {
            return Ok(PartParameter::Group(self.name("after `per`")?));
        }
        let name = self.name("as a parameter of a part")?;
        let kind = Box::new(self.type_of("after the name of a parameter")?);
        let default = match self.take(Token::Equal) {
            Some(_) => Some(self.expression("as the default of a parameter")?),
            None => None,
        };
        Ok(PartParameter::Value { name, kind, default })
    }

    fn uses(&mut self) -> Read<UseDeclaration> {
        let file = self.quoted("after `use`: a file")?;
        let alias = match self.take_word("as") {
            Some(_) => Some(self.name("after `as`")?),
            None => None,
        };
        Ok(UseDeclaration { file, alias })
    }
}
