//! Places in source texts.

use serde::Serialize;

/// Which text a span lies in: an index into the [`Sources`] of a run.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord, Serialize)]
pub struct FileId(pub u32);

/// A half-open range of bytes in one source text.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord, Serialize)]
pub struct Span {
    /// The text.
    pub file: FileId,
    /// First byte.
    pub start: u32,
    /// One past the last byte.
    pub end: u32,
}

impl Span {
    /// The span of the bytes `start..end` of `file`.
    pub fn new(file: FileId, start: usize, end: usize) -> Span {
        let clamp = |at: usize| u32::try_from(at).unwrap_or(u32::MAX);
        Span { file, start: clamp(start), end: clamp(end) }
    }

    /// The smallest span that holds both; both lie in the same text.
    pub fn to(self, other: Span) -> Span {
        Span { file: self.file, start: self.start.min(other.start), end: self.end.max(other.end) }
    }
}

/// One source text with its name and the starts of its lines.
#[derive(Clone, Debug)]
pub struct Source {
    /// The name that messages show: a path, mostly.
    pub name: String,
    /// The text.
    pub text: String,
    line_starts: Vec<u32>,
}

/// A place as people count it: line and column from 1, the column in characters.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
pub struct Position {
    /// Line, from 1.
    pub line: u32,
    /// Column in characters, from 1.
    pub column: u32,
}

impl Source {
    /// A source text under a name.
    pub fn new(name: impl Into<String>, text: impl Into<String>) -> Source {
        let text = text.into();
        let breaks = text.bytes().zip(1u32..).filter(|(byte, _)| *byte == b'\n').map(|(_, next)| next);
        let line_starts = std::iter::once(0).chain(breaks).collect();
        Source { name: name.into(), text, line_starts }
    }

    /// The line and column of a byte offset (clamped to the text and to a character's start).
    pub fn position(&self, offset: u32) -> Position {
        let mut at = (offset as usize).min(self.text.len());
        while !self.text.is_char_boundary(at) {
            at -= 1;
        }
        let line = self.line_starts.partition_point(|start| *start as usize <= at).max(1);
        let start = self.line_starts[line - 1] as usize;
        let column = self.text[start..at].chars().count() + 1;
        Position { line: line as u32, column: column as u32 }
    }
}

/// The source texts of a run: the model file and the files it uses.
#[derive(Clone, Debug, Default)]
pub struct Sources {
    files: Vec<Source>,
}

impl Sources {
    /// Adds a text and gives its id.
    pub fn add(&mut self, source: Source) -> FileId {
        self.files.push(source);
        FileId(self.files.len() as u32 - 1)
    }

    /// The text of an id that [`Sources::add`] gave.
    pub fn get(&self, file: FileId) -> &Source {
        &self.files[file.0 as usize]
    }

    /// The texts in the order in which they were added.
    pub fn iter(&self) -> impl Iterator<Item = (FileId, &Source)> {
        (0u32..).map(FileId).zip(&self.files)
    }
}
