//! Data drawn from a model: unknowns from their priors, responses from the unknowns, over the rows of tables that are
//! there or are laid out for the purpose.

use std::fmt;

use stook_lang::arena::Id;
use stook_lang::model::{Column, ColumnKind, Group, Index, Labels, Model, Table};

use crate::bind::{self, Bound, DataProblem};
use crate::draws::Scalar;
use crate::numeric::stream::Stream;
use crate::plan;
use crate::program::{Program, Scratch, State};
use crate::rule::Chain;
use crate::run::titles;
use crate::symbolic::Quantity;
use crate::table;

/// How a table is laid out that has no file: all combinations of its labels.
#[derive(Clone, Debug, Default)]
pub struct Layout {
    /// For open groups how many labels they get (for a nested group, inside each parent), by name.
    pub labels: Vec<(String, usize)>,
    /// For tables how many rows each combination gets (1 where not named), by name.
    pub rows: Vec<(String, usize)>,
}

/// A table of drawn data, as text.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct DrawnTable {
    /// The table's name in the model.
    pub name: String,
    /// The headings.
    pub headings: Vec<String>,
    /// The cells, row by row.
    pub rows: Vec<Vec<String>>,
}

/// Drawn data and what they were drawn from.
#[derive(Clone, Debug)]
pub struct Simulated {
    /// The tables.
    pub tables: Vec<DrawnTable>,
    /// Every scalar of every unknown.
    pub truth: Vec<(Scalar, f64)>,
}

/// Why data could not be drawn.
#[derive(Clone, Debug)]
pub enum SimulateProblem {
    /// An open group without a number of labels.
    Labels {
        /// The group.
        group: String,
    },
    /// A column of measurements that is no response, in a table without a file.
    Covariate {
        /// The table.
        table: String,
        /// The column.
        column: String,
    },
    /// The data at hand do not fit the model.
    Data(Vec<DataProblem>),
    /// The demands of the model cannot be met.
    Plan(Vec<plan::PlanProblem>),
    /// A prior or a law gave a number that is none.
    NotFinite {
        /// The scalar.
        scalar: String,
    },
}

impl fmt::Display for SimulateProblem {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            SimulateProblem::Labels { group } => write!(
                f,
                "`{group}` has no labels without data\n  help: say how many: --labels {group}=8, or give a table"
            ),
            SimulateProblem::Covariate { table, column } => write!(
                f,
                "`{column}` of `{table}` is no response, so its values must be given\n  help: give the table: --table \
                 {table}=FILE"
            ),
            SimulateProblem::Data(problems) => write!(f, "{} problems in the data", problems.len()),
            SimulateProblem::Plan(problems) => write!(f, "{} demands cannot be met", problems.len()),
            SimulateProblem::NotFinite { scalar } => write!(
                f,
                "`{scalar}` was drawn as a number that is none\n  help: a prior that reaches extreme values is the usual \
                 cause: narrow it, or take another --seed"
            ),
        }
    }
}

impl std::error::Error for SimulateProblem {}

/// The model with every cell of its responses missing: what is drawn.
pub fn design(model: &Model) -> Model {
    let mut model = model.clone();
    let responses: Vec<Id<Column>> = model.responses.iter().map(|response| response.column).collect();
    for column in responses {
        if let ColumnKind::Values { gaps, .. } = &mut model.columns[column].kind {
            *gaps = true;
        }
    }
    model
}

/// Draws data. `tables` holds what was read of each table's file, by position; responses need not be in them. A table
/// that was not read is laid out.
pub fn simulate(
    model: &Model,
    tables: Vec<Option<table::Table>>,
    layout: &Layout,
    settings: &[(String, f64)],
    seed: u64,
) -> Result<Simulated, SimulateProblem> {
    let model = design(model);
    let mut complete = vec![];
    for (read, id) in tables.into_iter().zip(model.tables.ids()) {
        complete.push(match read {
            Some(table) => without_responses(&model, id, table),
            None => laid_out(&model, id, layout)?,
        });
    }
    let bound = bind::bind(model, complete, settings).map_err(SimulateProblem::Data)?;
    let plan = plan::plan(&bound.model, Some(&bound)).map_err(SimulateProblem::Plan)?;
    let program = Program::new(&bound, &plan);
    let chain = drawn(&bound, &program, seed)?;
    let titles = titles(&bound, &program);
    let unknowns = program.quantities.iter().filter(|own| matches!(own.quantity, Quantity::Unknown(_)));
    let places = unknowns.flat_map(|own| (0..own.len()).map(|element| own.place(element)));
    let mut places: Vec<usize> = places.collect();
    places.sort_unstable();
    let truth = places.into_iter().map(|place| (titles[place].clone(), chain.state.values[place])).collect();
    let tables = bound.model.tables.ids().map(|table| written(&bound, &program, &chain, table)).collect();
    Ok(Simulated { tables, truth })
}

fn drawn(bound: &Bound, program: &Program, seed: u64) -> Result<Chain, SimulateProblem> {
    let state = State { values: vec![0.0; program.layout.len()], nodes: vec![vec![]; program.nodes.len()] };
    let mut chain = Chain { state, stream: Stream::new(seed, 0), scratch: Scratch::default() };
    program.refresh_all(&mut chain);
    for own in &program.quantities {
        for element in 0..own.len() {
            let value = own.draw(program, &mut chain, element);
            if !value.is_finite() {
                let scalar = titles(bound, program)[own.place(element)].title();
                return Err(SimulateProblem::NotFinite { scalar });
            }
            chain.state.values[own.place(element)] = value;
        }
        program.refresh(own.quantity, &mut chain);
    }
    Ok(chain)
}

/// A table as read, its responses emptied.
fn without_responses(model: &Model, id: Id<Table>, mut table: table::Table) -> table::Table {
    for (column, cells) in model.tables[id].columns.iter().zip(&mut table.columns) {
        if model.response_of(*column).is_some() {
            *cells = table::Column::Numbers { values: vec![f64::NAN; table.rows] };
        }
    }
    table
}

/// A table of all combinations of its labels.
fn laid_out(model: &Model, id: Id<Table>, layout: &Layout) -> Result<table::Table, SimulateProblem> {
    let declared = &model.tables[id];
    let mut rows: Vec<Vec<String>> = vec![vec![]];
    let mut label_columns = vec![];
    for column in &declared.columns {
        match &model.columns[*column].kind {
            ColumnKind::Labels { group, .. } => {
                let labels = labels(model, *group, layout)?;
                rows = rows
                    .into_iter()
                    .flat_map(|row| {
                        labels.iter().map(move |label| [row.as_slice(), std::slice::from_ref(label)].concat())
                    })
                    .collect();
                label_columns.push(*column);
            }
            ColumnKind::Values { .. } if model.response_of(*column).is_some() => {}
            ColumnKind::Values { .. } => {
                return Err(SimulateProblem::Covariate {
                    table: declared.name.clone(),
                    column: model.columns[*column].name.clone(),
                });
            }
        }
    }
    let each = layout.rows.iter().find(|(name, _)| *name == declared.name).map_or(1, |(_, each)| *each);
    let each = if declared.per.is_some() { 1 } else { each };
    let rows: Vec<Vec<String>> = rows.into_iter().flat_map(|row| std::iter::repeat_n(row, each)).collect();
    let columns = declared
        .columns
        .iter()
        .map(|column| match label_columns.iter().position(|other| other == column) {
            Some(at) => interned(rows.iter().map(|row| row[at].clone())),
            None => table::Column::Numbers { values: vec![f64::NAN; rows.len()] },
        })
        .collect();
    Ok(table::Table::made(declared.name.clone(), rows.len(), columns))
}

/// The labels that a group gets: its fixed ones, or as many as are asked for.
fn labels(model: &Model, group: Id<Group>, layout: &Layout) -> Result<Vec<String>, SimulateProblem> {
    let declared = &model.groups[group];
    match &declared.labels {
        Labels::Closed(labels) => Ok(labels.clone()),
        Labels::Range(first, last) => Ok((*first..=*last).map(|label| label.to_string()).collect()),
        Labels::Open => match layout.labels.iter().find(|(name, _)| *name == declared.name) {
            Some((_, count)) => Ok((1..=*count).map(|label| label.to_string()).collect()),
            None => Err(SimulateProblem::Labels { group: declared.name.clone() }),
        },
    }
}

fn interned(cells: impl Iterator<Item = String>) -> table::Column {
    let mut labels: Vec<String> = vec![];
    let mut codes = vec![];
    for cell in cells {
        let code = labels.iter().position(|label| *label == cell).unwrap_or_else(|| {
            labels.push(cell);
            labels.len() - 1
        });
        codes.push(code as u32);
    }
    table::Column::Labels { labels, codes }
}

/// A table as text, with its responses as drawn.
fn written(bound: &Bound, program: &Program, chain: &Chain, id: Id<Table>) -> DrawnTable {
    let model = &bound.model;
    let columns = &model.tables[id].columns;
    let cell = |column: Id<Column>, row: usize| match &model.columns[column].kind {
        ColumnKind::Labels { group, .. } => {
            let title = bound.title(Index::Group(*group), bound.labels(column)[row] as usize);
            match model.groups[*group].parent {
                Some(_) => title.rsplit_once('/').map_or(title.clone(), |(_, own)| own.to_string()),
                None => title,
            }
        }
        ColumnKind::Values { .. } => {
            let (values, missing) = bound.values(column);
            match missing.binary_search(&(row as u32)) {
                Ok(at) => {
                    let place = program.layout.range(Quantity::Cells(column)).start + at;
                    chain.state.values[place].to_string()
                }
                Err(_) => values[row].to_string(),
            }
        }
    };
    let rows =
        (0..bound.table(id).count).map(|row| columns.iter().map(|column| cell(*column, row)).collect());
    DrawnTable {
        name: model.tables[id].name.clone(),
        headings: columns.iter().map(|column| model.columns[*column].heading.clone()).collect(),
        rows: rows.collect(),
    }
}
