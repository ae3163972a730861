//! The grammar file against the parser: sentences made from every production are read without a problem, and so is every
//! example.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

use std::collections::{BTreeMap, BTreeSet};

use stook_lang::span::FileId;
use stook_lang::syntax::parse;

const GRAMMAR: &str = include_str!("../../grammar/stook.ebnf");

/// A right-hand side.
#[derive(Clone, Debug)]
enum Rule {
    Word(String),
    Name(String),
    Sequence(Vec<Rule>),
    Choice(Vec<Rule>),
    /// Fewest and most times.
    Repeat(Box<Rule>, usize, usize),
}

/// Reads W3C EBNF: `name ::= rule`, `'word'`, `( )`, `|`, `?`, `*`, `+`, comments between `/*` and `*/`.
struct Reader<'a> {
    tokens: Vec<&'a str>,
    at: usize,
}

fn productions(text: &str) -> BTreeMap<String, Rule> {
    let mut plain = String::new();
    let mut rest = text;
    while let Some((before, after)) = rest.split_once("/*") {
        plain.push_str(before);
        rest = after.split_once("*/").expect("comments are closed").1;
    }
    plain.push_str(rest);
    let mut found = BTreeMap::new();
    let starts: Vec<usize> = plain.match_indices("::=").map(|(at, _)| at).collect();
    for (at, start) in starts.iter().enumerate() {
        let name = plain[..*start].split_whitespace().last().unwrap().to_string();
        let end = starts.get(at + 1).map_or(plain.len(), |next| {
            let before = plain[..*next].trim_end();
            before.rfind(char::is_whitespace).unwrap()
        });
        let mut reader = Reader { tokens: tokens(&plain[start + 3..end]), at: 0 };
        found.insert(name, reader.choice());
    }
    found
}

fn tokens(text: &str) -> Vec<&str> {
    let mut found = vec![];
    let mut rest = text.trim_start();
    while !rest.is_empty() {
        let length = match rest.as_bytes()[0] {
            b'\'' => rest[1..].find('\'').unwrap() + 2,
            b'(' | b')' | b'|' | b'?' | b'*' | b'+' => 1,
            _ => rest.find(|c: char| !c.is_alphanumeric()).unwrap_or(rest.len()),
        };
        found.push(&rest[..length]);
        rest = rest[length..].trim_start();
    }
    found
}

impl Reader<'_> {
    fn peek(&self) -> &str {
        self.tokens.get(self.at).copied().unwrap_or("")
    }

    fn choice(&mut self) -> Rule {
        let mut options = vec![self.sequence()];
        while self.peek() == "|" {
            self.at += 1;
            options.push(self.sequence());
        }
        if options.len() == 1 { options.remove(0) } else { Rule::Choice(options) }
    }

    fn sequence(&mut self) -> Rule {
        let mut parts = vec![];
        while !matches!(self.peek(), "" | "|" | ")") {
            let token = self.peek().to_string();
            self.at += 1;
            let mut rule = if token == "(" {
                let inner = self.choice();
                assert_eq!(self.peek(), ")");
                self.at += 1;
                inner
            } else if let Some(word) = token.strip_prefix('\'') {
                Rule::Word(word.trim_end_matches('\'').to_string())
            } else {
                Rule::Name(token)
            };
            let times = match self.peek() {
                "?" => Some((0, 1)),
                "*" => Some((0, 2)),
                "+" => Some((1, 3)),
                _ => None,
            };
            if let Some((fewest, most)) = times {
                self.at += 1;
                rule = Rule::Repeat(Box::new(rule), fewest, most);
            }
            parts.push(rule);
        }
        Rule::Sequence(parts)
    }
}

/// Makes sentences; deep down it takes the shortest way out.
struct Maker<'a> {
    grammar: &'a BTreeMap<String, Rule>,
    used: BTreeSet<String>,
    random: u64,
}

impl Maker<'_> {
    fn below(&mut self, count: usize) -> usize {
        // Knuth's linear congruential generator (MMIX).
        self.random =
            self.random.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
        ((self.random >> 33) as usize) % count
    }

    fn make(&mut self, rule: &Rule, depth: usize, out: &mut Vec<String>) {
        match rule {
            Rule::Word(word) => out.push(word.clone()),
            Rule::Name(name) => match name.as_str() {
                "name" => {
                    let names = ["hive", "honey", "x_1", "größe", "real", "sd"];
                    out.push(names[self.below(names.len())].to_string());
                }
                "number" => out.push(["3", "0.5", "1e-3"][self.below(3)].to_string()),
                "integer" => out.push(["3", "2010"][self.below(2)].to_string()),
                "text" => out.push([r#""kg""#, r#""a \"b\" \\""#][self.below(2)].to_string()),
                _ => {
                    self.used.insert(name.clone());
                    let inner =
                        self.grammar.get(name).unwrap_or_else(|| panic!("no production {name}")).clone();
                    self.make(&inner, depth + 1, out);
                }
            },
            Rule::Sequence(parts) => parts.iter().for_each(|part| self.make(part, depth, out)),
            Rule::Choice(options) => {
                let chosen = if depth > 22 { self.shortest(options) } else { self.below(options.len()) };
                self.make(&options[chosen], depth, out);
            }
            Rule::Repeat(inner, fewest, most) => {
                let times = if depth > 18 { *fewest } else { fewest + self.below(most - fewest + 1) };
                (0..times).for_each(|_| self.make(inner, depth, out));
            }
        }
    }

    /// The option that leads least far down: a token before a production, `atom` through a number.
    fn shortest(&self, options: &[Rule]) -> usize {
        let ends = |rule: &Rule| match rule {
            Rule::Sequence(parts) => parts.iter().all(|part| match part {
                Rule::Word(_) => true,
                Rule::Name(name) => !self.grammar.contains_key(name),
                _ => false,
            }),
            _ => false,
        };
        options.iter().position(ends).unwrap_or(options.len() - 1)
    }
}

fn problems(text: &str) -> Vec<String> {
    let (_, problems) = parse(text, FileId(0));
    // With the text up to the place: sentences are long.
    let upto = |end: usize| {
        text[..end].chars().rev().take(60).collect::<Vec<_>>().into_iter().rev().collect::<String>()
    };
    let told = |report: &stook_lang::problem::Report| {
        let end = report.labels.iter().map(|label| label.span.end as usize).max().unwrap_or(0);
        format!("{}: {} at ...{}", report.code.0, report.message, upto(end))
    };
    problems.reports().iter().map(told).collect()
}

#[test]
fn sentences_of_every_production_are_read_without_a_problem() {
    let grammar = productions(GRAMMAR);
    let mut maker = Maker { grammar: &grammar, used: BTreeSet::new(), random: 1 };
    for _ in 0..300 {
        let mut words = vec![];
        maker.make(&Rule::Name("model".into()), 0, &mut words);
        let text = words.join(" ");
        let found = problems(&text);
        assert!(found.is_empty(), "{found:?}\n{text}");
    }
    let unused: Vec<&String> = grammar.keys().filter(|name| !maker.used.contains(*name)).collect();
    assert!(unused.is_empty(), "never used: {unused:?}");
}

#[test]
fn a_sentence_that_lost_a_bracket_or_a_word_of_its_form_is_refused() {
    for text in [
        "group",
        "group hive within",
        "table t { a : real",
        "unknown x real follows normal(mean: 0, sd: 1)",
        "unknown x : real follows normal(mean: 0, sd: 1",
        "unknown x : real follows normal(mean: 0 sd: 1)",
        "let a 3",
        "let a = ",
        "let a = 1 +",
        "let a = if b then c",
        "let a = sum(b over)",
        "let a = b[",
        "ladder { rung }",
        "ladder rung a",
        "use soil",
        "let a = 1 < 2 < 3",
    ] {
        assert!(!problems(text).is_empty(), "{text}");
    }
}

#[test]
fn every_example_is_read_without_a_problem() {
    let root = concat!(env!("CARGO_MANIFEST_DIR"), "/../examples");
    let mut read = 0;
    for folder in std::fs::read_dir(root).unwrap() {
        let Ok(files) = std::fs::read_dir(folder.unwrap().path()) else { continue };
        for file in files {
            let path = file.unwrap().path();
            if path.extension().is_some_and(|ending| ending == "stook") {
                let found = problems(&std::fs::read_to_string(&path).unwrap());
                assert!(found.is_empty(), "{}: {found:?}", path.display());
                read += 1;
            }
        }
    }
    assert!(read >= 3);
}
