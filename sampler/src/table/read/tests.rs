//! Reading against the plain reader of the csv crate, in small blocks and on several threads.
#![allow(clippy::unwrap_used)]

use super::*;
use crate::numeric::stream::Stream;

fn requests() -> Vec<Request> {
    vec![
        Request { heading: "plot".into(), kind: Kind::Labels },
        Request { heading: "yield".into(), kind: Kind::Numbers },
    ]
}

/// A random table with quotes, line ends inside quotes, gaps and blank lines.
fn random_table(stream: &mut Stream) -> String {
    let end = if stream.uniform() < 0.5 { "\n" } else { "\r\n" };
    let mut text = if stream.uniform() < 0.3 { "\u{feff}" } else { "" }.to_string();
    text.push_str(&format!("note,plot, yield {end}"));
    for row in 0..(stream.uniform() * 40.0) as usize + 1 {
        let note = match (stream.uniform() * 4.0) as usize {
            0 => "\"a, \"\"b\"\"\"".to_string(),
            1 => format!("\"two{end}lines\""),
            _ => "plain".to_string(),
        };
        let plot = ["A", "B", "\"C d\"", " e ", ""][(stream.uniform() * 5.0) as usize];
        let number = ["1.5", "-2", "NA", "", "1e3", "\" 7 \""][(stream.uniform() * 6.0) as usize];
        text.push_str(&format!("{note},{plot},{number}{end}"));
        if row % 7 == 3 {
            text.push_str(end);
        }
    }
    text
}

/// The same by the csv crate alone, row by row: labels, numbers, lines.
fn plainly(text: &str) -> (Vec<Option<String>>, Vec<Option<f64>>, Vec<usize>) {
    let mut reader = csv::ReaderBuilder::new().trim(csv::Trim::All).from_reader(text.as_bytes());
    let (mut labels, mut numbers, mut lines) = (vec![], vec![], vec![]);
    for record in reader.records() {
        let record = record.unwrap();
        labels.push((!record[1].is_empty()).then(|| record[1].to_string()));
        numbers.push(record[2].parse().ok());
        // The position of a record lies before the blank lines that were skipped.
        let mut start = record.position().unwrap().byte() as usize;
        while matches!(text.as_bytes().get(start), Some(b'\n' | b'\r')) {
            start += 1;
        }
        lines.push(text[..start].matches('\n').count() + 1);
    }
    (labels, numbers, lines)
}

#[test]
fn blocks_and_threads_give_what_a_plain_reading_gives() {
    let mut stream = Stream::new(11, 0);
    for _ in 0..300 {
        let text = random_table(&mut stream);
        let (labels, numbers, lines) = plainly(&text);
        for (block, threads) in [(16, 1), (64, 3), (1 << 16, 2)] {
            let format = Format { threads, ..Format::default() };
            let table = read_blocks(text.as_bytes(), "t.csv", &requests(), &format, block).unwrap();
            assert_eq!(table.rows, labels.len(), "{text}");
            let Column::Labels { labels: names, codes } = &table.columns[0] else { continue };
            let found: Vec<Option<String>> =
                codes.iter().map(|code| names.get(*code as usize).cloned()).collect();
            assert_eq!(found, labels, "{text}");
            let Column::Numbers { values } = &table.columns[1] else { continue };
            let found: Vec<Option<f64>> = values.iter().map(|v| (!v.is_nan()).then_some(*v)).collect();
            assert_eq!(found, numbers, "{text}");
            let found: Vec<usize> = (0..table.rows).map(|row| table.line(row)).collect();
            assert_eq!(found, lines, "{text}");
        }
    }
}

#[test]
fn every_prefix_of_a_file_gives_a_table_or_a_message() {
    let mut stream = Stream::new(12, 0);
    let text = random_table(&mut stream);
    for end in 0..text.len() {
        let _ = read_blocks(&text.as_bytes()[..end], "t.csv", &requests(), &Format::default(), 32);
    }
}

#[test]
fn semicolons_and_tabs_are_found_out() {
    for delimiter in [";", "\t"] {
        let text = "plot,yield\nA,1.5\n".replace(',', delimiter);
        let table = read(text.as_bytes(), "t.csv", &requests(), &Format::default()).unwrap();
        assert_eq!(table.columns[1], Column::Numbers { values: vec![1.5] });
    }
}
