//! Problems with data and with demanded updates as their reader sees them: the pages of `explain` hold, and what they say
//! is kept in snapshots.
//!
//! T007 to T010 cannot be shown in a page, as these say: their files are made of bytes here.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

use std::io::Read;

use stook_lang::check::{check_source, check_text};
use stook_lang::model::Model;
use stook_lang::problem::render;
use stook_lang::span::{Source, Sources};
use stook_sampler::bind::{self, Bound};
use stook_sampler::plan;
use stook_sampler::report::DataReport;
use stook_sampler::table::{self, Format, Table, TableProblem};

/// The model of an example and its files.
fn parts(example: &str) -> (&str, Vec<(&str, &str)>) {
    let mut parts = example.split("--- ");
    let model = parts.next().unwrap();
    (model, parts.map(|part| part.split_once('\n').unwrap()).collect())
}

fn checked(text: &str) -> Model {
    let (model, problems) = check_text(text);
    model.unwrap_or_else(|| panic!("{:#?}", problems.reports()))
}

/// Reads and binds an example; the problems of its tables come before those of the binding.
fn bound(example: &str, settings: &[(String, f64)]) -> Result<Bound, Vec<DataReport>> {
    let (text, files) = parts(example);
    let model = checked(text);
    let mut tables: Vec<Table> = vec![];
    let mut reports = vec![];
    for (id, (name, text)) in model.tables.ids().zip(&files) {
        match read(&model, id, text.as_bytes(), name) {
            Ok(table) => tables.push(table),
            Err(found) => reports.extend(found.iter().map(|problem| problem.report())),
        }
    }
    if !reports.is_empty() {
        return Err(reports);
    }
    bind::bind(model, tables, settings)
        .map_err(|found| found.iter().map(|problem| problem.report()).collect())
}

fn read(
    model: &Model,
    id: stook_lang::arena::Id<stook_lang::model::Table>,
    source: impl Read + Send,
    name: &str,
) -> Result<Table, Vec<TableProblem>> {
    table::read(source, name, &bind::requests(model, id), &Format::default())
}

/// A report in the order in which it is read; a place in the model is shown by its text.
fn shown(report: &DataReport, text: &str) -> String {
    let mut lines = vec![format!("{}: {}", report.code.0, report.message)];
    for place in &report.places {
        lines.push(format!("  {}, line {}, {}: \"{}\"", place.file, place.line, place.heading, place.text));
    }
    if report.more > 0 {
        lines.push(format!("  and {} more", report.more));
    }
    if let Some(span) = report.span {
        lines.push(format!("  in the model: {}", &text[span.start as usize..span.end as usize]));
    }
    lines.push(format!("  help: {}", report.help));
    lines.join("\n")
}

fn keep(name: &str, text: String) {
    insta::with_settings!({ omit_expression => true, prepend_module_to_snapshot => false, snapshot_path => "snapshots/data" }, {
        insta::assert_snapshot!(name.to_string(), text);
    });
}

/// Codes whose wrong example cannot be shown in a text.
const BY_BYTES: [&str; 4] = ["T007", "T008", "T009", "T010"];

#[test]
fn every_wrong_example_has_its_problem() {
    for page in bind::pages().iter().chain(table::pages()) {
        if BY_BYTES.contains(&page.code.0) {
            continue;
        }
        // B010 and B011 are about `--set`, as their pages say.
        let (settings, example) = match page.code.0 {
            "B010" => (vec![("typical".to_string(), -3.0)], page.right),
            "B011" => (vec![("typcal".to_string(), 4.0)], page.right),
            _ => (vec![], page.wrong),
        };
        let reports = bound(example, &settings).expect_err(page.code.0);
        assert!(reports.iter().any(|report| report.code == page.code), "{}: {reports:#?}", page.code.0);
        let texts: Vec<String> = reports.iter().map(|report| shown(report, parts(example).0)).collect();
        keep(page.code.0, texts.join("\n"));
    }
}

#[test]
fn every_right_example_binds() {
    for page in bind::pages().iter().chain(table::pages()) {
        let settings = if page.code.0 == "B011" { vec![("typical".to_string(), 4.0)] } else { vec![] };
        if let Err(reports) = bound(page.right, &settings) {
            panic!("{}: {reports:#?}", page.code.0);
        }
    }
}

/// A source that fails, as a disk or a network folder may.
struct Broken;

impl Read for Broken {
    fn read(&mut self, _: &mut [u8]) -> std::io::Result<usize> {
        Err(std::io::Error::new(std::io::ErrorKind::PermissionDenied, "permission denied"))
    }
}

#[test]
fn files_that_no_page_can_show_have_their_problems() {
    let page = table::pages().iter().find(|page| page.code.0 == "T007").unwrap();
    let (text, _) = parts(page.right);
    let model = checked(text);
    let id = model.tables.ids().next().unwrap();
    let problem =
        |source: Box<dyn Read + Send>| read(&model, id, source, "trial.csv").unwrap_err()[0].report();
    let latin: &[u8] = b"plot,Yield (t/ha)\nA,5.1\nGr\xfcn,4.9\n";
    let zip: &[u8] = b"PK\x03\x04\x14\x00\x06\x00\x08\x00\x00\x00!\x00rest of a workbook";
    let found = [
        ("T007", problem(Box::new(latin))),
        ("T008", problem(Box::new(Broken))),
        ("T009", problem(Box::new(zip))),
        // Four thousand million rows take too long to read: the problem itself.
        ("T010", TableProblem::TooManyRows { file: "trial.csv".into(), rows: 4_294_967_296 }.report()),
    ];
    for (code, report) in found {
        assert_eq!(report.code.0, code, "{report:#?}");
        keep(code, shown(&report, text));
    }
}

/// The rendered problems of the plan of a text; empty where it can be planned.
fn planned(text: &str) -> String {
    let mut sources = Sources::default();
    let file = sources.add(Source::new("model.stook", text));
    let (model, problems) = check_source(&sources, file);
    let model = model.unwrap_or_else(|| panic!("{}", render(&problems.reports(), &sources, false)));
    match plan::plan(&model, None) {
        Ok(_) => String::new(),
        Err(found) => {
            let reports: Vec<_> = found.iter().map(|problem| problem.report()).collect();
            render(&reports, &sources, false)
        }
    }
}

#[test]
fn the_pages_of_plans_hold() {
    for page in plan::pages() {
        let text = planned(page.wrong);
        assert!(text.contains(page.code.0), "{text}");
        keep(page.code.0, text);
        assert_eq!(planned(page.right), "");
    }
}

const DEMANDS: &[(&str, &str)] = &[
    (
        "P001_conjugate_poisson",
        "table boards { fallen : count }\nunknown rate : positive follows lognormal(log_mean: 0, log_sd: 1) by conjugate\nresponse fallen follows poisson(mean: rate)\n",
    ),
    (
        "P001_conjugate_not_linear",
        "table hives { honey : real }\nunknown level : real follows normal(mean: 0, sd: 1) by conjugate\nresponse honey follows normal(mean: level ^ 2, sd: 1)\n",
    ),
    (
        "P001_joint_count",
        "group hive\ntable boards { hive, fallen : count }\nunknown dev : real per hive follows normal(mean: 0, sd: 1) by joint\nresponse fallen follows poisson(log_mean: dev)\n",
    ),
    (
        "P001_joint_heavy_prior",
        "table hives { honey : real }\nunknown level : real follows cauchy(centre: 0, scale: 1) by joint\nresponse honey follows normal(mean: level, sd: 1)\n",
    ),
    (
        "P001_enumerate_real",
        "table hives { honey : real }\nunknown level : real follows normal(mean: 0, sd: 1) by enumerate\nresponse honey follows normal(mean: level, sd: 1)\n",
    ),
    (
        "P001_enumerate_endless_count",
        "table hives { honey : real }\nunknown frames : count follows poisson(mean: 8) by enumerate\nresponse honey follows normal(mean: frames, sd: 1)\n",
    ),
];

#[test]
fn demands_that_cannot_be_met_say_what_would_do() {
    for (name, text) in DEMANDS {
        let found = planned(text);
        assert!(found.contains("P001"), "{name}: planned");
        keep(name, found);
    }
}
