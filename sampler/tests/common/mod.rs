//! Small models with drawn data, for tests of the rules.
#![allow(dead_code, unreachable_pub, clippy::unwrap_used, clippy::expect_used, clippy::panic)]

pub mod cases;

use std::sync::Arc;

use stook_lang::arena::Id;
use stook_lang::model::{Column, Model};
use stook_sampler::bind::{self, Bound, Cells};
use stook_sampler::numeric::stream::Stream;
use stook_sampler::plan::{self, Plan};
use stook_sampler::program::{Program, Scratch, State};
use stook_sampler::rule::Chain;
use stook_sampler::simulate::{self, Layout};
use stook_sampler::table::{self, Format};

/// A checked model; the text must have no problem but warnings.
pub fn model(text: &str) -> Model {
    let (model, problems) = stook_lang::check::check_text(text);
    match model {
        Some(model) => model,
        None => panic!("{:#?}", problems.reports()),
    }
}

/// A model with its data drawn from it: three labels for each group, some rows for each combination.
pub fn drawn(text: &str, rows: usize, seed: u64) -> (Bound, Plan) {
    let model = model(text);
    let layout = Layout {
        labels: model.groups.iter().map(|(_, group)| (group.name.clone(), 3)).collect(),
        rows: model.tables.iter().map(|(_, table)| (table.name.clone(), rows)).collect(),
    };
    let tables = model.tables.iter().map(|_| None).collect();
    let simulated = simulate::simulate(&model, tables, &layout, &[], seed).unwrap();
    let tables = simulated.tables.iter().zip(model.tables.ids()).map(|(drawn, id)| {
        let mut text = drawn.headings.join(",");
        for row in &drawn.rows {
            text.push('\n');
            text.push_str(&row.join(","));
        }
        text.push('\n');
        let requests = bind::requests(&model, id);
        table::read(text.as_bytes(), &drawn.name, &requests, &Format::default()).unwrap()
    });
    let tables = tables.collect();
    bound(model, tables)
}

/// A model with its tables given as comma-separated text, in the order of the model.
pub fn with_tables(text: &str, tables: &[&str]) -> (Bound, Plan) {
    let model = model(text);
    let read = model.tables.ids().zip(tables).map(|(id, text)| {
        let requests = bind::requests(&model, id);
        table::read(text.as_bytes(), "table.csv", &requests, &Format::default()).unwrap()
    });
    let read = read.collect();
    bound(model, read)
}

fn bound(model: Model, tables: Vec<table::Table>) -> (Bound, Plan) {
    let bound = bind::bind(model, tables, &[]).unwrap();
    let plan = plan::plan(&bound.model, Some(&bound)).unwrap();
    (bound, plan)
}

/// A chain whose state is drawn from the priors.
pub fn from_priors(program: &Program, stream: Stream) -> Chain {
    let state = State { values: vec![0.0; program.layout.len()], nodes: vec![vec![]; program.nodes.len()] };
    let mut chain = Chain { state, stream, scratch: Scratch::default() };
    redraw(program, &mut chain);
    chain
}

/// Draws every quantity of the state from its own law, in order.
pub fn redraw(program: &Program, chain: &mut Chain) {
    program.refresh_all(chain);
    for own in &program.quantities {
        for element in 0..own.len() {
            let value = own.draw(program, chain, element);
            chain.state.values[own.place(element)] = value;
        }
        program.refresh(own.quantity, chain);
    }
}

/// The data with the values of a response replaced.
pub fn replace(bound: &mut Bound, column: Id<Column>, values: Vec<f64>) {
    let Cells::Values { missing, .. } = &bound.columns[column.position()] else { panic!("no values") };
    bound.columns[column.position()] = Cells::Values { values: values.into(), missing: Arc::clone(missing) };
}
