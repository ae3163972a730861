//! Expressions, by precedence climbing (Richards 1979): a long sum is a loop, not a recursion.

use super::cursor::{Cursor, Read, Stuck};
use crate::arena::Id;
use crate::problem::SyntaxProblem;
use crate::span::Span;
use crate::syntax::token::Token;
use crate::syntax::tree::{Argument, BinaryOperator, Expression, ExpressionKind, Selector, UnaryOperator};

/// The deepest nesting of parentheses, brackets and branches.
const DEEPEST: usize = 200;

/// How tightly operators bind, loosest first.
const OR: u8 = 1;
const AND: u8 = 2;
const NOT: u8 = 3;
const COMPARISON: u8 = 4;
const SUM: u8 = 5;
const PRODUCT: u8 = 6;
const NEGATION: u8 = 7;
const POWER: u8 = 8;

impl Cursor<'_> {
    /// Any expression.
    pub(super) fn expression(&mut self, context: &'static str) -> Read<Id<Expression>> {
        self.climb(OR, context)
    }

    /// An expression in which `and` does not belong: the ends of `between a and b`.
    pub(super) fn end(&mut self, context: &'static str) -> Read<Id<Expression>> {
        self.climb(SUM, context)
    }

    fn add(&mut self, span: Span, kind: ExpressionKind) -> Id<Expression> {
        self.tree.expressions.add(Expression { span, kind })
    }

    fn place(&self, id: Id<Expression>) -> Span {
        self.tree.expressions[id].span
    }

    fn nested<T>(&mut self, read: impl FnOnce(&mut Self) -> Read<T>) -> Read<T> {
        if self.depth >= DEEPEST {
            self.problems.add(SyntaxProblem::TooDeep { span: self.span(), deepest: DEEPEST });
            return Err(Stuck);
        }
        self.depth += 1;
        let result = read(self);
        self.depth -= 1;
        result
    }

    fn climb(&mut self, loosest: u8, context: &'static str) -> Read<Id<Expression>> {
        let mut left = self.prefix(loosest, context)?;
        let mut compared: Option<Span> = None;
        loop {
            let (operator, binds) = match self.operator() {
                Some(found) if found.1 >= loosest => found,
                _ => return Ok(left),
            };
            let span = self.advance();
            if binds == COMPARISON {
                if let Some(first) = compared {
                    self.problems.add(SyntaxProblem::ChainedComparison { first, second: span });
                }
                compared = Some(span);
            }
            // A power is read from the right: 2^3^2 is 2^(3^2), and its exponent may be negated.
            let right = match binds {
                POWER => self.nested(|cursor| cursor.climb(NEGATION, context))?,
                _ => self.nested(|cursor| cursor.climb(binds + 1, context))?,
            };
            let whole = self.place(left).to(self.place(right));
            left = self.add(whole, ExpressionKind::Binary(operator, left, right));
        }
    }

    fn operator(&mut self) -> Option<(BinaryOperator, u8)> {
        let found = match self.token() {
            Token::Plus => (BinaryOperator::Add, SUM),
            Token::Minus => (BinaryOperator::Subtract, SUM),
            Token::Star => (BinaryOperator::Multiply, PRODUCT),
            Token::Slash => (BinaryOperator::Divide, PRODUCT),
            Token::Caret => (BinaryOperator::Power, POWER),
            Token::EqualEqual => (BinaryOperator::Equal, COMPARISON),
            Token::NotEqual => (BinaryOperator::NotEqual, COMPARISON),
            Token::Less => (BinaryOperator::Less, COMPARISON),
            Token::LessEqual => (BinaryOperator::LessOrEqual, COMPARISON),
            Token::Greater => (BinaryOperator::Greater, COMPARISON),
            Token::GreaterEqual => (BinaryOperator::GreaterOrEqual, COMPARISON),
            Token::Word if self.is_word("and") => (BinaryOperator::And, AND),
            Token::Word if self.is_word("or") => (BinaryOperator::Or, OR),
            _ => return None,
        };
        Some(found)
    }

    fn prefix(&mut self, loosest: u8, context: &'static str) -> Read<Id<Expression>> {
        if self.is_word("if") {
            return self.nested(|cursor| cursor.branch());
        }
        let (operator, binds) = match self.token() {
            Token::Minus => (UnaryOperator::Negate, NEGATION),
            Token::Word if self.is_word("not") && loosest <= NOT => (UnaryOperator::Not, NOT),
            _ => {
                let atom = self.atom(context)?;
                return self.postfix(atom);
            }
        };
        let span = self.advance();
        let inner = self.nested(|cursor| cursor.climb(binds, context))?;
        let whole = span.to(self.place(inner));
        Ok(self.add(whole, ExpressionKind::Unary(operator, inner)))
    }

    fn branch(&mut self) -> Read<Id<Expression>> {
        let start = self.advance();
        let condition = self.expression("after `if`")?;
        self.expect_word("then", "after the condition of `if`")?;
        let then = self.expression("after `then`")?;
        self.expect_word("else", "after the value of `then`: every `if` has an `else`")?;
        let otherwise = self.expression("after `else`")?;
        let span = start.to(self.place(otherwise));
        Ok(self.add(span, ExpressionKind::If { condition, then, otherwise }))
    }

    fn atom(&mut self, context: &'static str) -> Read<Id<Expression>> {
        match self.token() {
            Token::Number => {
                let span = self.advance();
                let value = self.number(span);
                Ok(self.add(span, ExpressionKind::Number(value)))
            }
            Token::Text => {
                let text = self.quoted(context)?;
                Ok(self.add(text.span, ExpressionKind::Text(text.text)))
            }
            Token::OpenParenthesis => self.nested(|cursor| {
                let open = cursor.advance();
                let inner = cursor.expression("between parentheses")?;
                let close = cursor.close(Token::CloseParenthesis, open)?;
                // The parentheses belong to the place, so that messages show them.
                cursor.tree.expressions[inner].span = open.to(close);
                Ok(inner)
            }),
            Token::Word if !crate::syntax::token::RESERVED.contains(&self.word()) => {
                let name = self.name(context)?;
                if self.token() == Token::OpenParenthesis {
                    return self.nested(|cursor| cursor.call(name));
                }
                Ok(self.add(name.span, ExpressionKind::Name(name)))
            }
            _ => self.wrong("an expression", context),
        }
    }

    fn number(&mut self, span: Span) -> f64 {
        let value = self.slice(span).parse().unwrap_or(f64::INFINITY);
        if !f64::is_finite(value) {
            self.problems.add(SyntaxProblem::NumberTooLarge { span });
            return 0.0;
        }
        value
    }

    /// Asks for a closing token; where it is missing the opening one is shown.
    pub(super) fn close(&mut self, token: Token, open: Span) -> Read<Span> {
        if let Some(span) = self.take(token) {
            return Ok(span);
        }
        // `1,5` between parentheses is mostly a decimal comma.
        let found = match self.token() {
            Token::Word => format!("`{}`", self.word()),
            Token::Number => format!("the number {}", self.slice(self.span())),
            Token::Text => format!("the text {}", self.slice(self.span())),
            other => other.written().to_string(),
        };
        self.problems.add(SyntaxProblem::Unclosed { open, close: token.written(), span: self.span(), found });
        Err(Stuck)
    }

    fn postfix(&mut self, mut base: Id<Expression>) -> Read<Id<Expression>> {
        loop {
            match self.token() {
                Token::OpenBracket => base = self.nested(|cursor| cursor.selected(base))?,
                Token::Dot => {
                    self.advance();
                    let name = self.name("after `.`")?;
                    let span = self.place(base).to(name.span);
                    base = self.add(span, ExpressionKind::Member { base, name });
                }
                _ => return Ok(base),
            }
        }
    }

    fn selected(&mut self, base: Id<Expression>) -> Read<Id<Expression>> {
        let open = self.advance();
        let mut selectors = vec![];
        loop {
            let selector = match self.token() {
                Token::Text => Selector::Label(self.quoted("between brackets")?),
                Token::Number => {
                    let span = self.advance();
                    self.problems.add(SyntaxProblem::NumericIndex { span, text: self.slice(span).into() });
                    return self.close(Token::CloseBracket, open).map(|_| base);
                }
                Token::Word if self.is_word("previous") => {
                    self.advance();
                    Selector::Previous(self.name("after `previous`")?)
                }
                Token::Word if self.is_word("next") && self.peek(1) == Token::Word => {
                    self.advance();
                    Selector::Next(self.name("after `next`")?)
                }
                _ => Selector::Role(self.name("between brackets: a label in quotes, or a role")?),
            };
            selectors.push(selector);
            if self.take(Token::Comma).is_none() {
                break;
            }
        }
        let close = self.close(Token::CloseBracket, open)?;
        let span = self.place(base).to(close);
        Ok(self.add(span, ExpressionKind::Select { base, selectors }))
    }

    fn call(&mut self, name: crate::syntax::tree::Name) -> Read<Id<Expression>> {
        let open = self.advance();
        let mut arguments = vec![];
        if let Some(close) = self.take(Token::CloseParenthesis) {
            return Ok(self.add(name.span.to(close), ExpressionKind::Call { name, arguments }));
        }
        loop {
            if self.take_word("per").is_some() {
                arguments.push(Argument::Group(self.name("after `per`")?));
            } else if self.token() == Token::Word && self.peek(1) == Token::Colon {
                let argument = self.name("as an argument's name")?;
                self.advance();
                arguments.push(Argument::Named(argument, self.expression("as an argument")?));
            } else {
                let value = self.expression("as an argument")?;
                if arguments.is_empty() && self.is_word("over") {
                    return self.reduction(name, value, open);
                }
                arguments.push(Argument::Positional(value));
            }
            if self.token() == Token::Equal {
                self.problems.add(SyntaxProblem::EqualInCall { span: self.span() });
                return Err(Stuck);
            }
            if self.take(Token::Comma).is_none() {
                break;
            }
        }
        let close = self.close(Token::CloseParenthesis, open)?;
        Ok(self.add(name.span.to(close), ExpressionKind::Call { name, arguments }))
    }

    fn reduction(
        &mut self,
        name: crate::syntax::tree::Name,
        body: Id<Expression>,
        open: Span,
    ) -> Read<Id<Expression>> {
        self.advance();
        let over = self.name("after `over`: a group or a table")?;
        let per = match self.take_word("per") {
            Some(_) => self.names("after `per`")?,
            None => vec![],
        };
        let close = self.close(Token::CloseParenthesis, open)?;
        Ok(self.add(name.span.to(close), ExpressionKind::Reduce { name, body, over, per }))
    }
}
