//! A file read in blocks of whole records, which threads share; the columns do not depend on how many.

use std::collections::{BTreeMap, HashMap};
use std::io::Read;
use std::sync::Mutex;
use std::sync::mpsc::{Receiver, SyncSender, sync_channel};

use super::block::{self, Block, Part, Plan, Quick};
use super::problem::{Cell, TableProblem};
use super::{Column, Format, Kind, Request, Table};

/// Bytes of a block: large enough that hand-overs do not count, small enough to stay in a cache.
const BLOCK: usize = 1 << 21;
/// The longest heading line.
const LONGEST_HEADING: usize = 1 << 20;

/// Reads the columns that are asked for. Blanks around cells and blank lines are skipped; quoted cells may hold delimiters,
/// quotes (doubled) and line ends; a byte-order mark and Windows line ends are taken for granted.
///
/// # Errors
/// Every problem of the file, each with the first few places and a count.
pub fn read(
    source: impl Read + Send,
    file: &str,
    requests: &[Request],
    format: &Format,
) -> Result<Table, Vec<TableProblem>> {
    read_blocks(source, file, requests, format, BLOCK)
}

fn read_blocks(
    source: impl Read + Send,
    file: &str,
    requests: &[Request],
    format: &Format,
    block: usize,
) -> Result<Table, Vec<TableProblem>> {
    let name = file.to_string();
    let mut blocks = Blocks::new(source, block);
    let unreadable = |problem: std::io::Error| {
        vec![TableProblem::Unreadable { file: name.clone(), cause: problem.to_string() }]
    };
    let heading = blocks.heading().map_err(unreadable)?;
    let heading_lines = memchr::memchr_iter(b'\n', &heading).count().max(1);
    let (plan, headings) = plan(file, &heading, requests, format)?;
    let mut growing = Growth::new(file, requests, heading_lines);
    let workers = format.threads.max(1);
    let mut failure = None;
    let (to_workers, waiting) = sync_channel::<(usize, Vec<u8>)>(workers + 1);
    let waiting = Mutex::new(waiting);
    std::thread::scope(|scope| {
        let (to_main, done) = sync_channel::<(usize, Block)>(workers + 1);
        let (waiting, plan) = (&waiting, &plan);
        for _ in 0..workers {
            let to_main = to_main.clone();
            scope.spawn(move || work(plan, waiting, &to_main));
        }
        drop(to_main);
        let reader = scope.spawn(move || feed(blocks, &to_workers));
        growing.take_all(&done);
        failure = reader.join().ok().and_then(Result::err);
    });
    if let Some(problem) = failure {
        return Err(unreadable(problem));
    }
    growing.finish(headings.len())
}

/// Parses blocks until there are no more.
fn work(plan: &Plan, waiting: &Mutex<Receiver<(usize, Vec<u8>)>>, to_main: &SyncSender<(usize, Block)>) {
    loop {
        let next = match waiting.lock() {
            Ok(waiting) => waiting.recv(),
            Err(_) => return,
        };
        let Ok((at, bytes)) = next else { return };
        if to_main.send((at, block::read(plan, &bytes))).is_err() {
            return;
        }
    }
}

/// Hands blocks out, in order and numbered.
fn feed(
    mut blocks: Blocks<impl Read>,
    to_workers: &SyncSender<(usize, Vec<u8>)>,
) -> Result<(), std::io::Error> {
    let mut at = 0;
    while let Some(bytes) = blocks.next_block()? {
        if to_workers.send((at, bytes)).is_err() {
            return Ok(());
        }
        at += 1;
    }
    Ok(())
}

/// A source cut into blocks that end where a record does.
struct Blocks<R> {
    source: R,
    size: usize,
    rest: Vec<u8>,
    ended: bool,
    started: bool,
}

impl<R: Read> Blocks<R> {
    fn new(source: R, size: usize) -> Blocks<R> {
        Blocks { source, size, rest: vec![], ended: false, started: false }
    }

    /// Reads up to a block more; false at the end.
    fn more(&mut self) -> Result<bool, std::io::Error> {
        let before = self.rest.len();
        let read = (&mut self.source).take(self.size as u64).read_to_end(&mut self.rest)?;
        self.ended = read == 0;
        if !self.started && (self.rest.len() >= 3 || self.ended) {
            self.started = true;
            if self.rest.starts_with(b"\xef\xbb\xbf") {
                self.rest.drain(..3);
            }
        }
        Ok(self.rest.len() > before || read > 0)
    }

    /// The first record, with its line end.
    fn heading(&mut self) -> Result<Vec<u8>, std::io::Error> {
        loop {
            let end = record_ends(&self.rest).next();
            if let Some(end) = end.filter(|_| self.started) {
                let line: Vec<u8> = self.rest.drain(..end).collect();
                if line.trim_ascii().is_empty() && !(self.ended && self.rest.is_empty()) {
                    continue;
                }
                return Ok(line);
            }
            if self.ended || self.rest.len() > LONGEST_HEADING {
                return Ok(std::mem::take(&mut self.rest));
            }
            self.more()?;
        }
    }

    fn next_block(&mut self) -> Result<Option<Vec<u8>>, std::io::Error> {
        loop {
            if !self.ended {
                self.more()?;
            }
            if self.ended {
                return Ok((!self.rest.is_empty()).then(|| std::mem::take(&mut self.rest)));
            }
            if let Some(end) = last_record_end(&self.rest) {
                let tail = self.rest.split_off(end);
                return Ok(Some(std::mem::replace(&mut self.rest, tail)));
            }
        }
    }
}

/// The places behind each record: line ends outside quotes.
fn record_ends(bytes: &[u8]) -> impl Iterator<Item = usize> + '_ {
    let mut inside = false;
    memchr::memchr2_iter(b'\n', b'"', bytes).filter_map(move |at| {
        if bytes[at] == b'"' {
            inside = !inside;
            return None;
        }
        (!inside).then_some(at + 1)
    })
}

fn last_record_end(bytes: &[u8]) -> Option<usize> {
    if memchr::memchr(b'"', bytes).is_none() {
        return memchr::memrchr(b'\n', bytes).map(|at| at + 1);
    }
    record_ends(bytes).last()
}

/// Finds the requested columns in the heading line.
fn plan(
    file: &str,
    heading: &[u8],
    requests: &[Request],
    format: &Format,
) -> Result<(Plan, Vec<String>), Vec<TableProblem>> {
    let file = file.to_string();
    if memchr::memchr(0, heading).is_some() {
        return Err(vec![TableProblem::NoTable { file }]);
    }
    let Ok(text) = std::str::from_utf8(heading) else {
        return Err(vec![TableProblem::NotText { file, line: 1, byte: 0 }]);
    };
    if text.trim().is_empty() {
        return Err(vec![TableProblem::Empty { file }]);
    }
    let delimiter = format.delimiter.unwrap_or_else(|| sniffed(text));
    let mut reader =
        csv::ReaderBuilder::new().has_headers(false).flexible(true).delimiter(delimiter).from_reader(heading);
    let mut record = csv::StringRecord::new();
    let _ = reader.read_record(&mut record);
    let headings: Vec<String> = record.iter().map(|heading| heading.trim().to_string()).collect();
    let mut problems = vec![];
    let mut wanted = vec![];
    for request in requests {
        let places: Vec<usize> =
            (0..headings.len()).filter(|at| headings[*at] == request.heading.trim()).collect();
        match places[..] {
            [place] => wanted.push((place, request.kind)),
            [] => problems.push(TableProblem::MissingColumn {
                file: file.clone(),
                heading: request.heading.clone(),
                nearest: stook_lang::nearest::nearest(&request.heading, headings.iter().map(String::as_str))
                    .map(str::to_string),
                headings: headings.clone(),
            }),
            _ => problems.push(TableProblem::DuplicateHeading {
                file: file.clone(),
                heading: request.heading.clone(),
            }),
        }
    }
    if problems.is_empty() {
        Ok((Plan::new(wanted, headings.len(), delimiter, format), headings))
    } else {
        Err(problems)
    }
}

/// The most frequent of tab, comma and semicolon.
fn sniffed(text: &str) -> u8 {
    let count = |delimiter: u8| text.bytes().filter(|byte| *byte == delimiter).count();
    [b'\t', b';', b','].into_iter().max_by_key(|delimiter| count(*delimiter)).unwrap_or(b',')
}

/// The columns as they grow, block after block.
struct Growth<'r> {
    file: String,
    requests: &'r [Request],
    rows: usize,
    line: usize,
    jumps: Vec<(usize, usize)>,
    columns: Vec<Column>,
    known: Vec<HashMap<Box<[u8]>, u32, Quick>>,
    cells: Vec<(Vec<Cell>, usize)>,
    ragged: (Vec<(usize, usize)>, usize),
    not_text: Option<(usize, usize)>,
}

impl<'r> Growth<'r> {
    fn new(file: &str, requests: &'r [Request], heading_lines: usize) -> Growth<'r> {
        let columns = requests
            .iter()
            .map(|request| match request.kind {
                Kind::Labels => Column::Labels { labels: vec![], codes: vec![] },
                Kind::Numbers | Kind::YesNo => Column::Numbers { values: vec![] },
            })
            .collect();
        Growth {
            file: file.to_string(),
            requests,
            rows: 0,
            line: heading_lines,
            jumps: if heading_lines == 1 { vec![] } else { vec![(0, heading_lines + 1)] },
            columns,
            known: requests.iter().map(|_| HashMap::default()).collect(),
            cells: requests.iter().map(|_| (vec![], 0)).collect(),
            ragged: (vec![], 0),
            not_text: None,
        }
    }

    /// Takes blocks as they come and appends them in their order.
    fn take_all(&mut self, done: &Receiver<(usize, Block)>) {
        let mut early: BTreeMap<usize, Block> = BTreeMap::new();
        let mut next = 0;
        for (at, block) in done {
            early.insert(at, block);
            while let Some(block) = early.remove(&next) {
                self.append(block);
                next += 1;
            }
        }
    }

    fn append(&mut self, block: Block) {
        let line = |within: usize| self.line + within + 1;
        for (at, (first, count)) in block.faults.cells.into_iter().enumerate() {
            let room = block::SHOWN - self.cells[at].0.len().min(block::SHOWN);
            let new = first.into_iter().take(room).map(|(within, text)| Cell { line: line(within), text });
            self.cells[at].0.extend(new);
            self.cells[at].1 += count;
        }
        let room = block::SHOWN - self.ragged.0.len().min(block::SHOWN);
        let ragged = block.faults.ragged.0.iter().take(room).map(|(within, fields)| (line(*within), *fields));
        self.ragged.0.extend(ragged);
        self.ragged.1 += block.faults.ragged.1;
        if let Some((byte, within)) = block.faults.not_text {
            self.not_text.get_or_insert((line(within), byte));
        }
        // A block begins in the line after the last of the one before.
        let follows = self.jumps.last().map_or(2 + self.rows, |(row, line)| line + self.rows - row);
        if block.rows > 0 && block.jumps.first().is_none_or(|(row, _)| *row > 0) && follows != line(0) {
            self.jumps.push((self.rows, line(0)));
        }
        self.jumps.extend(block.jumps.iter().map(|(row, within)| (self.rows + row, line(*within))));
        for (at, part) in block.parts.into_iter().enumerate() {
            match (part, &mut self.columns[at]) {
                (Part::Numbers { values: new }, Column::Numbers { values }) => values.extend(new),
                (Part::Labels { labels: new, codes: own }, Column::Labels { labels, codes }) => {
                    let known = &mut self.known[at];
                    let mapped: Vec<u32> = new
                        .into_iter()
                        .map(|label| match known.get(&label) {
                            Some(code) => *code,
                            None => {
                                let code = labels.len() as u32;
                                labels.push(String::from_utf8_lossy(&label).into_owned());
                                known.insert(label, code);
                                code
                            }
                        })
                        .collect();
                    codes.extend(
                        own.iter().map(|code| mapped.get(*code as usize).copied().unwrap_or(u32::MAX)),
                    );
                }
                _ => {}
            }
        }
        self.rows += block.rows;
        self.line += block.lines;
    }

    fn finish(self, fields: usize) -> Result<Table, Vec<TableProblem>> {
        let file = self.file;
        let mut problems = vec![];
        if let Some((line, byte)) = self.not_text {
            problems.push(TableProblem::NotText { file: file.clone(), line, byte });
        }
        if self.ragged.1 > 0 {
            let (rows, count) = self.ragged;
            problems.push(TableProblem::Ragged { file: file.clone(), fields, rows, count });
        }
        for (request, (cells, count)) in self.requests.iter().zip(self.cells) {
            if count > 0 {
                problems.push(TableProblem::NoNumber {
                    file: file.clone(),
                    heading: request.heading.clone(),
                    yes_no: request.kind == Kind::YesNo,
                    cells,
                    count,
                });
            }
        }
        if problems.is_empty() && self.rows == 0 {
            problems.push(TableProblem::NoRows { file: file.clone() });
        }
        if self.rows >= u32::MAX as usize {
            problems.push(TableProblem::TooManyRows { file: file.clone(), rows: self.rows });
        }
        if !problems.is_empty() {
            return Err(problems);
        }
        Ok(Table { file, rows: self.rows, columns: self.columns, lines: self.jumps })
    }
}

#[cfg(test)]
mod tests;
