//! One block of whole records: its cells to columns with labels of its own.

use std::collections::HashMap;

use super::cell;
use super::{Format, Kind};

/// What a block is read with.
pub(super) struct Plan {
    /// For each column that is wanted its place in the record and what it holds.
    pub(super) wanted: Vec<(usize, Kind)>,
    /// Fields of a record.
    pub(super) fields: usize,
    pub(super) delimiter: u8,
    gaps: Vec<Vec<u8>>,
}

impl Plan {
    pub(super) fn new(wanted: Vec<(usize, Kind)>, fields: usize, delimiter: u8, format: &Format) -> Plan {
        let gaps = format.gaps.iter().map(|gap| gap.trim().as_bytes().to_vec()).collect();
        Plan { wanted, fields, delimiter, gaps }
    }

    fn is_gap(&self, cell: &[u8]) -> bool {
        self.gaps.iter().any(|gap| gap == cell)
    }
}

/// A column of a block.
pub(super) enum Part {
    Labels { labels: Vec<Box<[u8]>>, codes: Vec<u32> },
    Numbers { values: Vec<f64> },
}

/// A cell that is no number, and a row with too many or too few fields.
#[derive(Default)]
pub(super) struct Faults {
    /// For each wanted column the first few cells: line in the block from 0, text; and how many.
    pub(super) cells: Vec<(Vec<(usize, String)>, usize)>,
    /// The first few rows: line, fields; and how many.
    pub(super) ragged: (Vec<(usize, usize)>, usize),
    /// The byte at which the block is not UTF-8, and its line.
    pub(super) not_text: Option<(usize, usize)>,
}

/// A block that was read.
pub(super) struct Block {
    pub(super) parts: Vec<Part>,
    pub(super) rows: usize,
    /// Lines that the block takes in the file.
    pub(super) lines: usize,
    /// Rows that do not stand in the line after the row before: `(row, line)`, both from 0 in the block.
    pub(super) jumps: Vec<(usize, usize)>,
    pub(super) faults: Faults,
}

/// How many cells of one fault are kept.
pub(super) const SHOWN: usize = 5;

/// Reads a block of whole records.
pub(super) fn read(plan: &Plan, bytes: &[u8]) -> Block {
    let mut reading = Reading::new(plan);
    if let Err(problem) = std::str::from_utf8(bytes) {
        let at = problem.valid_up_to();
        reading.faults.not_text = Some((at, count_lines(&bytes[..at])));
    } else if memchr::memchr(b'"', bytes).is_some() {
        reading.quoted(bytes);
    } else {
        reading.plain(bytes);
    }
    let parts = reading.columns.into_iter().map(Growing::finish).collect();
    let lines = count_lines(bytes);
    Block { parts, rows: reading.rows, lines, jumps: reading.jumps, faults: reading.faults }
}

fn count_lines(bytes: &[u8]) -> usize {
    memchr::memchr_iter(b'\n', bytes).count()
}

struct Reading<'p> {
    plan: &'p Plan,
    columns: Vec<Growing>,
    rows: usize,
    next_line: usize,
    jumps: Vec<(usize, usize)>,
    faults: Faults,
}

impl<'p> Reading<'p> {
    fn new(plan: &'p Plan) -> Reading<'p> {
        let columns = plan.wanted.iter().map(|(_, kind)| Growing::new(*kind)).collect();
        let cells = plan.wanted.iter().map(|_| (vec![], 0)).collect();
        let faults = Faults { cells, ..Faults::default() };
        Reading { plan, columns, rows: 0, next_line: 0, jumps: vec![], faults }
    }

    /// Without quotes a record is a line, and a field ends at a delimiter.
    fn plain(&mut self, bytes: &[u8]) {
        let mut fields: Vec<&[u8]> = Vec::with_capacity(self.plan.fields);
        let mut start = 0;
        let mut line = 0;
        while start < bytes.len() {
            let end = memchr::memchr(b'\n', &bytes[start..]).map_or(bytes.len(), |at| start + at);
            let record = &bytes[start..end];
            let record = record.strip_suffix(b"\r").unwrap_or(record);
            if !record.trim_ascii().is_empty() || self.plan.fields == 1 && !record.is_empty() {
                fields.clear();
                let mut from = 0;
                for at in memchr::memchr_iter(self.plan.delimiter, record) {
                    fields.push(&record[from..at]);
                    from = at + 1;
                }
                fields.push(&record[from..]);
                self.record(line, fields.len(), |at| fields[at]);
            }
            start = end + 1;
            line += 1;
        }
    }

    fn quoted(&mut self, bytes: &[u8]) {
        let mut reader = csv::ReaderBuilder::new()
            .has_headers(false)
            .flexible(true)
            .delimiter(self.plan.delimiter)
            .from_reader(bytes);
        let mut record = csv::ByteRecord::new();
        let (mut counted, mut line) = (0, 0);
        // Reading from memory cannot fail.
        while let Ok(true) = reader.read_byte_record(&mut record) {
            // The reader's position lies before the blank lines that it skipped.
            let mut start = record.position().map_or(0, |position| position.byte() as usize);
            while matches!(bytes.get(start), Some(b'\n' | b'\r')) {
                start += 1;
            }
            line += count_lines(&bytes[counted..start]);
            counted = start;
            let blank = record.len() == 1 && record.get(0).is_none_or(|cell| cell.trim_ascii().is_empty());
            if !blank || self.plan.fields == 1 {
                self.record(line, record.len(), |at| record.get(at).unwrap_or_default());
            }
        }
    }

    fn record<'b>(&mut self, line: usize, fields: usize, field: impl Fn(usize) -> &'b [u8]) {
        if fields != self.plan.fields {
            if self.faults.ragged.0.len() < SHOWN {
                self.faults.ragged.0.push((line, fields));
            }
            self.faults.ragged.1 += 1;
            return;
        }
        if line != self.next_line {
            self.jumps.push((self.rows, line));
        }
        self.next_line = line + 1;
        for (at, (place, _)) in self.plan.wanted.iter().enumerate() {
            let cell = cell::trimmed(field(*place));
            if !self.columns[at].add(self.plan, cell) {
                let (first, count) = &mut self.faults.cells[at];
                if first.len() < SHOWN {
                    first.push((line, String::from_utf8_lossy(cell).into_owned()));
                }
                *count += 1;
            }
        }
        self.rows += 1;
    }
}

/// A column that grows.
enum Growing {
    Labels { labels: Vec<Box<[u8]>>, codes: Vec<u32>, known: HashMap<Box<[u8]>, u32, Quick>, last: u32 },
    Numbers { values: Vec<f64>, yes_no: bool },
}

impl Growing {
    fn new(kind: Kind) -> Growing {
        match kind {
            Kind::Labels => {
                Growing::Labels { labels: vec![], codes: vec![], known: HashMap::default(), last: 0 }
            }
            Kind::Numbers => Growing::Numbers { values: vec![], yes_no: false },
            Kind::YesNo => Growing::Numbers { values: vec![], yes_no: true },
        }
    }

    /// Adds a cell; false where it cannot be read.
    fn add(&mut self, plan: &Plan, cell: &[u8]) -> bool {
        match self {
            Growing::Labels { labels, codes, known, last } => {
                if labels.get(*last as usize).is_some_and(|label| **label == *cell) {
                    codes.push(*last);
                    return true;
                }
                if plan.is_gap(cell) {
                    codes.push(u32::MAX);
                    return true;
                }
                let code = match known.get(cell) {
                    Some(code) => *code,
                    None => {
                        let code = labels.len() as u32;
                        labels.push(cell.into());
                        known.insert(cell.into(), code);
                        code
                    }
                };
                *last = code;
                codes.push(code);
                true
            }
            Growing::Numbers { values, yes_no } => {
                let value = if *yes_no { cell::yes_no(cell) } else { cell::number(cell) };
                match value {
                    Some(value) => values.push(value),
                    None => values.push(f64::NAN),
                }
                value.is_some() || plan.is_gap(cell)
            }
        }
    }

    fn finish(self) -> Part {
        match self {
            Growing::Labels { labels, codes, .. } => Part::Labels { labels, codes },
            Growing::Numbers { values, .. } => Part::Numbers { values },
        }
    }
}

/// A hash of short texts: eight bytes at a time, each a multiplication (Knuth 1973, section 6.4).
#[derive(Clone, Copy, Debug, Default)]
pub(super) struct Quick(u64);

impl std::hash::BuildHasher for Quick {
    type Hasher = Quick;
    fn build_hasher(&self) -> Quick {
        Quick(0)
    }
}

impl std::hash::Hasher for Quick {
    fn write(&mut self, bytes: &[u8]) {
        for chunk in bytes.chunks(8) {
            let mut word = [0u8; 8];
            word[..chunk.len()].copy_from_slice(chunk);
            self.write_u64(u64::from_le_bytes(word));
        }
    }
    fn write_u64(&mut self, word: u64) {
        self.0 = (self.0.rotate_left(29) ^ word).wrapping_mul(0x9e37_79b9_7f4a_7c15);
    }
    fn write_usize(&mut self, word: usize) {
        self.write_u64(word as u64);
    }
    fn finish(&self) -> u64 {
        self.0.rotate_left(26)
    }
}
