//! `stook simulate`: data drawn from a model, written as tables.

use std::path::Path;

use stook_lang::arena::Id;
use stook_lang::model::{ColumnKind, Model, Table};
use stook_sampler::bind;
use stook_sampler::run::Options;
use stook_sampler::simulate::{Layout, SimulateProblem, Simulated, simulate};
use stook_sampler::table;

use super::session::{at, tell, tell_demands};
use crate::arguments::{Setting, SimulateArguments};
use crate::data::{self, Tables, Wanted, strange};
use crate::folder::{self, Origin, Target};
use crate::load::{self, Loaded};
use crate::outcome::Outcome;
use crate::report::{Failure, Reporter};
use crate::screen::Screen;
use crate::screen::text::{counted, wrap};

/// Carries it out.
pub(crate) fn run(arguments: &SimulateArguments) -> Outcome {
    let reporter = Reporter::new(arguments.model.messages);
    let path = &arguments.model.model;
    let target = match Target::choose(arguments.out.as_deref(), path, "simulated") {
        Ok(target) => target,
        Err(failure) => return reporter.mistake(&failure),
    };
    let Some(loaded) = load::model(path, &reporter) else { return Outcome::Mistake };
    let rung = match arguments.rung.as_ref().map(|name| load::rung(&loaded.model, name)).transpose() {
        Ok(rung) => rung,
        Err(failure) => return reporter.mistake(&failure),
    };
    let model = at(&loaded.model, rung);
    let wanted = match wanted(&model, arguments) {
        Ok(wanted) => wanted,
        Err(failure) => return reporter.mistake(&failure),
    };
    let Some(read) = data::read(&model, &wanted, &arguments.data.gaps, &reporter) else {
        return Outcome::Mistake;
    };
    let files = read.files.clone();
    let layout = Layout { labels: pairs(&arguments.labels), rows: pairs(&arguments.rows) };
    let tables = with_responses(&model, read);
    let simulated = match simulate(&model, tables, &layout, &arguments.data.settings(), arguments.seed) {
        Ok(simulated) => simulated,
        Err(problem) => {
            report(&problem, &loaded, &reporter);
            return Outcome::Mistake;
        }
    };
    let origin = Origin {
        command: "simulate",
        model: loaded.file.clone(),
        rung: arguments.rung.clone(),
        data: files,
        settings: settings(&model, arguments),
        gaps: arguments.data.gaps.clone(),
        options: Options { seed: arguments.seed, ..Options::default() },
    };
    let names = file_names(&model);
    let written = target.begin().and_then(|staging| {
        folder::write_simulated(staging.path(), &simulated, &names, &origin)?;
        staging.finish()
    });
    match written {
        Ok(()) => reporter.end(screen(&Screen::stdout(), &simulated, &names, target.folder())),
        Err(failure) => reporter.mistake(&failure),
    }
}

/// The value of every setting.
fn settings(model: &Model, arguments: &SimulateArguments) -> Vec<(String, f64)> {
    let said = arguments.data.settings();
    let mut values: Vec<f64> = vec![];
    for (_, given) in model.givens.iter() {
        let own = said.iter().rev().find(|(name, _)| *name == given.name);
        values.push(own.map_or_else(|| bind::constant(model, &values, given.default), |(_, value)| *value));
    }
    model.givens.iter().map(|(_, given)| given.name.clone()).zip(values).collect()
}

/// The tables to read: those named with `--table`, and those whose file is there and that are not to be laid out.
fn wanted(model: &Model, arguments: &SimulateArguments) -> Result<Vec<Wanted>, Failure> {
    data::known(model, &arguments.data)?;
    let tables: Vec<&str> = model.tables.iter().map(|(_, table)| table.name.as_str()).collect();
    let groups: Vec<&str> = model.groups.iter().map(|(_, group)| group.name.as_str()).collect();
    if let Some(setting) = arguments.rows.iter().find(|setting| !tables.contains(&setting.name.as_str())) {
        return Err(strange("table", &setting.name, &tables));
    }
    if let Some(setting) = arguments.labels.iter().find(|setting| !groups.contains(&setting.name.as_str())) {
        return Err(strange("group", &setting.name, &groups));
    }
    let mut wanted = vec![];
    for (id, declared) in model.tables.iter() {
        let named = arguments.data.tables.iter().any(|setting| setting.name == declared.name);
        let Some(file) = data::file(model, id, &arguments.model.model, &arguments.data) else { continue };
        if named || (!is_laid_out(model, id, arguments) && file.exists()) {
            wanted.push(Wanted { table: id, file, requests: requests(model, id) });
        }
    }
    Ok(wanted)
}

/// Whether the command line says how a table is laid out: its rows, or the labels of one of its columns.
fn is_laid_out(model: &Model, table: Id<Table>, arguments: &SimulateArguments) -> bool {
    let declared = &model.tables[table];
    let by_labels = declared.columns.iter().any(|column| match &model.columns[*column].kind {
        ColumnKind::Labels { group, .. } => {
            arguments.labels.iter().any(|setting| setting.name == model.groups[*group].name)
        }
        ColumnKind::Values { .. } => false,
    });
    by_labels || arguments.rows.iter().any(|setting| setting.name == declared.name)
}

/// What is asked of a file: every column that is no response, as those are drawn.
fn requests(model: &Model, table: Id<Table>) -> Vec<table::Request> {
    let requests = bind::requests(model, table).into_iter().zip(&model.tables[table].columns);
    requests.filter(|(_, column)| model.response_of(**column).is_none()).map(|(request, _)| request).collect()
}

/// The tables as read, with an empty column for each response.
fn with_responses(model: &Model, read: Tables) -> Vec<Option<table::Table>> {
    let complete = |(table, id): (Option<table::Table>, Id<Table>)| {
        let mut table = table?;
        let mut cells = std::mem::take(&mut table.columns).into_iter();
        for column in &model.tables[id].columns {
            let empty = || Some(table::Column::Numbers { values: vec![f64::NAN; table.rows] });
            let own = if model.response_of(*column).is_some() { empty() } else { cells.next() };
            table.columns.extend(own);
        }
        Some(table)
    };
    read.tables.into_iter().zip(model.tables.ids()).map(complete).collect()
}

fn pairs(settings: &[Setting<usize>]) -> Vec<(String, usize)> {
    settings.iter().map(|setting| (setting.name.clone(), setting.value)).collect()
}

/// For each table the name of its file: that of its default file, or its own name where it has none or another table's
/// file is called the same.
fn file_names(model: &Model) -> Vec<String> {
    let mut names: Vec<String> = vec![];
    for (_, table) in model.tables.iter() {
        let default = table.file.as_ref().and_then(|file| Path::new(file).file_name());
        let default = default.map(|name| name.to_string_lossy().into_owned());
        let name = default.filter(|name| !names.contains(name) && name != "truth.csv" && name != "run.json");
        names.push(name.unwrap_or_else(|| format!("{}.csv", table.name)));
    }
    names
}

fn report(problem: &SimulateProblem, loaded: &Loaded, reporter: &Reporter) {
    match problem {
        SimulateProblem::Data(problems) => tell(problems, loaded, reporter),
        SimulateProblem::Plan(problems) => tell_demands(problems, loaded, reporter),
        other => reporter.failure(&Failure::from_text(&other.to_string())),
    }
}

fn screen(screen: &Screen, simulated: &Simulated, files: &[String], folder: &Path) -> String {
    let mut out = format!("{}\n", screen.style.strong(&format!("Drawn data are in {}", folder.display())));
    for (table, file) in simulated.tables.iter().zip(files) {
        let rows = counted(table.rows.len(), "row", "rows");
        out.push_str(&wrap(&format!("{file}: {}, {rows}", table.name), screen.width, 2));
    }
    let values = counted(simulated.truth.len(), "value", "values");
    out.push_str(&wrap(
        &format!("truth.csv: the {values} of the unknowns that they were drawn from"),
        screen.width,
        2,
    ));
    out
}
