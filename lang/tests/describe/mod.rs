//! A checked model as text, for snapshots: every path written out.

use std::fmt::Write;

use stook_lang::arena::Id;
use stook_lang::model::{
    Access, BinaryOperator, ColumnKind, Distribution, Expression, Index, Labels, Model, Place, Step, Support,
    UnaryOperator,
};

/// The whole model, a line for each thing.
pub(crate) fn describe(model: &Model) -> String {
    let mut text = String::new();
    for (_, group) in model.groups.iter() {
        let parent = group.parent.map(|id| format!(" within {}", model.groups[id].name)).unwrap_or_default();
        let ordered = if group.ordered { " ordered" } else { "" };
        let labels = match &group.labels {
            Labels::Open => String::new(),
            Labels::Range(a, b) => format!(" {a}..{b}"),
            Labels::Closed(labels) => format!(" {{{}}}", labels.join(", ")),
        };
        line(&mut text, format!("group {}{parent}{ordered}{labels}", group.name));
    }
    for (_, table) in model.tables.iter() {
        let per = table.per.map(|id| format!(" per {}", model.groups[id].name)).unwrap_or_default();
        let file = table.file.as_ref().map(|file| format!(" from {file}")).unwrap_or_default();
        line(&mut text, format!("table {}{per}{file}", table.name));
        for id in &table.columns {
            let column = &model.columns[*id];
            let kind = match &column.kind {
                ColumnKind::Labels { group, parent } => {
                    let parent =
                        parent.map(|id| format!(" in {}", model.columns[id].name)).unwrap_or_default();
                    format!("labels of {}{parent}", model.groups[*group].name)
                }
                ColumnKind::Values { support, unit, gaps, between } => {
                    let unit = unit.as_ref().map(|unit| format!(" in {unit}")).unwrap_or_default();
                    let gaps = if *gaps { " with gaps" } else { "" };
                    let between = between
                        .map(|(a, b)| format!(" between {} and {}", written(model, a), written(model, b)))
                        .unwrap_or_default();
                    format!("{}{unit}{gaps}{between}", support_written(model, *support))
                }
            };
            let heading = if column.heading == column.name {
                String::new()
            } else {
                format!(" from {:?}", column.heading)
            };
            line(&mut text, format!("    {} : {kind}{heading}", column.name));
        }
    }
    for (_, given) in model.givens.iter() {
        let support = support_written(model, given.support);
        line(&mut text, format!("given {} : {support} = {}", given.name, written(model, given.default)));
    }
    for (_, unknown) in model.unknowns.iter() {
        let support = support_written(model, unknown.support);
        let per = per(model, &unknown.dimensions);
        let demand = unknown.demand.map(|demand| format!(" by {:?}", demand.rule)).unwrap_or_default();
        let prior = law(model, &unknown.prior);
        line(&mut text, format!("unknown {} : {support}{per} follows {prior}{demand}", unknown.name));
    }
    for (_, named) in model.named.iter() {
        let per = per(model, &named.dimensions);
        let value = written(model, named.value);
        let role = format!("{:?}", named.role).to_lowercase();
        line(&mut text, format!("{role} {}{per} = {value}", named.name));
    }
    for response in &model.responses {
        let name = &model.columns[response.column].name;
        line(&mut text, format!("response {name} follows {}", law(model, &response.distribution)));
    }
    for (_, rung) in model.ladder.iter() {
        let names: Vec<&str> = rung.terms.iter().map(|id| model.named[*id].name.as_str()).collect();
        line(&mut text, format!("rung {} has {}", rung.name, names.join(", ")).trim_end().to_string());
    }
    text
}

fn line(text: &mut String, line: String) {
    let _ = writeln!(text, "{line}");
}

fn per(model: &Model, dimensions: &[Index]) -> String {
    let names: Vec<&str> = dimensions.iter().map(|index| model.index_name(*index)).collect();
    if names.is_empty() { String::new() } else { format!(" per {}", names.join(", ")) }
}

fn support_written(model: &Model, support: Support) -> String {
    match support {
        Support::Real { low, high } => {
            let end = |word: &str, end: Option<Id<Expression>>| {
                end.map(|end| format!(" {word} {}", written(model, end))).unwrap_or_default()
            };
            format!("real{}{}", end("above", low), end("below", high))
        }
        other => other.words().to_string(),
    }
}

fn law(model: &Model, law: &Distribution) -> String {
    let parameters: Vec<String> = law.parameters.iter().map(|id| written(model, *id)).collect();
    let end = |word: &str, end: Option<Id<Expression>>| {
        end.map(|end| format!(" {word} {}", written(model, end))).unwrap_or_default()
    };
    format!("{:?}({}){}{}", law.law, parameters.join("; "), end("above", law.low), end("below", law.high))
}

fn accesses(model: &Model, accesses: &[Access]) -> String {
    if accesses.is_empty() {
        return String::new();
    }
    let ways: Vec<String> = accesses.iter().map(|access| way(model, access)).collect();
    format!("[{}]", ways.join("; "))
}

fn way(model: &Model, access: &Access) -> String {
    let mut text = match &access.place {
        Place::Variable(variable) => format!("${}", variable.0),
        Place::Label(_, label) => format!("{label:?}"),
    };
    for step in &access.steps {
        match step {
            Step::Column(column) => text.push_str(&format!(".{}", model.columns[*column].name)),
            Step::Parent(group) => text.push_str(&format!("^{}", model.groups[*group].name)),
            Step::Row(table) => text.push_str(&format!("->{}", model.tables[*table].name)),
        }
    }
    text
}

fn written(model: &Model, id: Id<Expression>) -> String {
    match &model.expressions[id] {
        Expression::Number(value) => value.to_string(),
        Expression::Given(id) => model.givens[*id].name.clone(),
        Expression::Unknown(id, ways) => format!("{}{}", model.unknowns[*id].name, accesses(model, ways)),
        Expression::Named(id, ways) => format!("{}{}", model.named[*id].name, accesses(model, ways)),
        Expression::Column(id, access) => format!("{}[{}]", model.columns[*id].name, way(model, access)),
        Expression::LabelTest { access, label, .. } => format!("{} == {label:?}", way(model, access)),
        Expression::Unary(UnaryOperator::Negate, a) => format!("-{}", written(model, *a)),
        Expression::Unary(UnaryOperator::Not, a) => format!("not ({})", written(model, *a)),
        Expression::Binary(operator, a, b) => {
            format!("({} {} {})", written(model, *a), sign(*operator), written(model, *b))
        }
        Expression::Call(function, arguments) => {
            let arguments: Vec<String> = arguments.iter().map(|id| written(model, *id)).collect();
            format!("{}({})", function.name(), arguments.join(", "))
        }
        Expression::If(c, a, b) => {
            format!("if {} then {} else {}", written(model, *c), written(model, *a), written(model, *b))
        }
        Expression::Reduce { reducer, over, body, matching } => {
            let matching: String = matching
                .iter()
                .map(|(inner, outer)| format!(" where {} = {}", way(model, inner), way(model, outer)))
                .collect();
            format!("{reducer:?}({} over {}{matching})", written(model, *body), model.index_name(*over))
        }
    }
}

fn sign(operator: BinaryOperator) -> &'static str {
    match operator {
        BinaryOperator::Add => "+",
        BinaryOperator::Subtract => "-",
        BinaryOperator::Multiply => "*",
        BinaryOperator::Divide => "/",
        BinaryOperator::Power => "^",
        BinaryOperator::Equal => "==",
        BinaryOperator::NotEqual => "!=",
        BinaryOperator::Less => "<",
        BinaryOperator::LessOrEqual => "<=",
        BinaryOperator::Greater => ">",
        BinaryOperator::GreaterOrEqual => ">=",
        BinaryOperator::And => "and",
        BinaryOperator::Or => "or",
    }
}
