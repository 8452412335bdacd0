//! Records of a file of any size, one at a time.

use super::super::lines::position;
use super::super::text::count_lines;
use std::io::{self, Read};

/// Bytes asked for at once.
const STEP: usize = 256 * 1024;
/// A line longer than this ends no record, whatever it starts with.
const LONGEST_END: usize = 4096;

/// Cuts a source of bytes into records; holds little more than one record at a time.
#[derive(Debug)]
pub struct Reader<R> {
    source: R,
    buffer: Vec<u8>,
    /// Bytes before this are used up.
    start: usize,
    /// Filled to here.
    end: usize,
    line: usize,
    number: usize,
    limit: usize,
    at_end: bool,
}

/// The bytes of one record.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Chunk<'a> {
    /// Number of the record, from 1.
    pub number: usize,
    /// Line of the file at which it starts, from 1.
    pub line: usize,
    /// Its bytes without the line `$$$$`; none if it is too long.
    pub bytes: &'a [u8],
    /// Whether it is longer than the limit.
    pub too_long: bool,
    /// Whether a line `$$$$` ended it.
    pub ended: bool,
}

impl<R: Read> Reader<R> {
    /// Longest record that is read: room for the largest V3000 tables and long data fields.
    pub const LIMIT: usize = 32_000_000;

    /// Records of `source`, none longer than [`Reader::LIMIT`].
    pub fn new(source: R) -> Reader<R> {
        Reader::with_limit(source, Reader::<R>::LIMIT)
    }

    /// Records of `source`, none longer than `limit` bytes.
    pub fn with_limit(source: R, limit: usize) -> Reader<R> {
        Reader {
            source,
            buffer: Vec::new(),
            start: 0,
            end: 0,
            line: 1,
            number: 0,
            limit,
            at_end: false,
        }
    }

    /// The next record; `None` at the end of the source.
    ///
    /// # Errors
    /// Those of the source.
    pub fn next_chunk(&mut self) -> io::Result<Option<Chunk<'_>>> {
        let line = self.line;
        let mut searched = self.start;
        let mut too_long = false;
        loop {
            let (to, after, ended) = match separator(self.filled(), searched, self.at_end) {
                Found::At { from, after } => (from, after, true),
                Found::NotBefore(_) if self.at_end => (self.end, self.end, false),
                Found::NotBefore(next) => {
                    searched = next;
                    if self.end - self.start > self.limit {
                        // forget what was seen and go on to the end of the record
                        too_long = true;
                        self.line += count_lines(self.piece(self.start, searched));
                        self.start = searched;
                    }
                    searched -= self.start;
                    self.fill()?;
                    continue;
                }
            };
            let from = std::mem::replace(&mut self.start, after);
            let blank = self.piece(from, to).iter().all(u8::is_ascii_whitespace);
            if !ended && !too_long && blank {
                return Ok(None);
            }
            self.line += count_lines(self.piece(from, after));
            self.number += 1;
            return Ok(Some(Chunk {
                number: self.number,
                line,
                bytes: if too_long { &[] } else { self.piece(from, to) },
                too_long,
                ended,
            }));
        }
    }

    fn piece(&self, from: usize, to: usize) -> &[u8] {
        self.buffer.get(from..to).unwrap_or_default()
    }

    fn filled(&self) -> &[u8] {
        self.buffer.get(..self.end).unwrap_or_default()
    }

    /// Moves what is left to the front of the buffer and reads on.
    fn fill(&mut self) -> io::Result<()> {
        self.buffer.copy_within(self.start..self.end, 0);
        self.end -= self.start;
        self.start = 0;
        if self.buffer.len() < self.end + STEP {
            self.buffer.resize(self.end + STEP, 0);
        }
        loop {
            match self
                .source
                .read(self.buffer.get_mut(self.end..).unwrap_or_default())
            {
                Ok(0) => self.at_end = true,
                Ok(n) => self.end += n,
                Err(e) if e.kind() == io::ErrorKind::Interrupted => continue,
                Err(e) => return Err(e),
            }
            return Ok(());
        }
    }
}

enum Found {
    /// A separator line starts at `from`; the next record at `after`.
    At { from: usize, after: usize },
    /// None starts before this byte, from which to search on.
    NotBefore(usize),
}

/// The first line `$$$$` at or after `searched`, which is no further back than the record's start.
fn separator(bytes: &[u8], searched: usize, at_end: bool) -> Found {
    let mut at = searched;
    loop {
        let rest = bytes.get(at..).unwrap_or_default();
        let Some(offset) = position(rest, b'$', b'$') else {
            return Found::NotBefore(bytes.len());
        };
        let from = at + offset;
        let starts_line = match from.checked_sub(1).and_then(|i| bytes.get(i)) {
            None => true,
            Some(b) => matches!(b, b'\n' | b'\r'),
        };
        let tail = bytes.get(from..).unwrap_or_default();
        if tail.len() < 4 && !at_end {
            return Found::NotBefore(from);
        }
        if starts_line && tail.starts_with(b"$$$$") {
            let end = position(tail, b'\n', b'\r');
            let after = match end.map(|e| (e, tail.get(e..))) {
                Some((e, Some([b'\r', b'\n', ..]))) => from + e + 2,
                // a line feed may follow
                Some((_, Some([b'\r']))) if !at_end => return Found::NotBefore(from),
                Some((e, _)) => from + e + 1,
                None if at_end => bytes.len(),
                None if tail.len() > LONGEST_END => {
                    at = from + 1;
                    continue;
                }
                None => return Found::NotBefore(from),
            };
            return Found::At { from, after };
        }
        at = from + 1;
    }
}
