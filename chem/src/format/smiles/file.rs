//! Files of lines: a molecule in each, then a blank and a name. Empty lines and those that begin with `#`
//! are no records.

use super::{MOST_CHARACTERS, read};
use crate::format::sdf::Chunk;
use std::io::{self, BufRead, Read};

/// Longest line that is kept: a molecule and a long name. (The molecule has a bound of its own.)
const LONGEST: usize = 4 * MOST_CHARACTERS;
/// Lines that are tried to tell what a file is.
const TRIED: usize = 20;
/// Characters of a line up to which it is tried.
const SHORT: usize = 5_000;

/// Whether the beginning of a file is one of such a file: of the first lines at least half, and one, are
/// molecules. Prose hardly ever is: few words are made of the symbols of the notation.
pub fn recognize(beginning: &[u8]) -> bool {
    let text = String::from_utf8_lossy(beginning);
    let text = text.strip_prefix('\u{feff}').unwrap_or(&text);
    let lines = text.split('\n').map(str::trim_end);
    let records = lines.filter(|l| !is_no_record(l) && l.len() <= SHORT);
    let (mut good, mut tried) = (0, 0);
    for line in records.take(TRIED) {
        tried += 1;
        good += usize::from(read(line).is_ok());
    }
    good > 0 && 2 * good >= tried
}

fn is_no_record(line: &str) -> bool {
    line.starts_with('#') || line.trim().is_empty()
}

/// Cuts a source of bytes into its lines, those left out that are no records.
#[derive(Debug)]
pub struct LineReader<R> {
    source: R,
    bytes: Vec<u8>,
    line: usize,
    number: usize,
}

impl<R: BufRead> LineReader<R> {
    /// The lines of a source.
    pub fn new(source: R) -> LineReader<R> {
        LineReader {
            source,
            bytes: Vec::new(),
            line: 0,
            number: 0,
        }
    }

    /// The next record; `None` at the end of the source. Of a line that is too long no bytes are kept.
    ///
    /// # Errors
    /// Those of the source.
    pub fn next_chunk(&mut self) -> io::Result<Option<Chunk<'_>>> {
        loop {
            self.bytes.clear();
            let limit = u64::try_from(LONGEST + 2).unwrap_or(u64::MAX);
            let n = Read::take(&mut self.source, limit).read_until(b'\n', &mut self.bytes)?;
            if n == 0 {
                return Ok(None);
            }
            self.line += 1;
            let ended = self.bytes.last() == Some(&b'\n');
            let too_long = n > LONGEST;
            if too_long && !ended {
                self.source.skip_until(b'\n')?;
            }
            while matches!(self.bytes.last(), Some(b'\n' | b'\r')) {
                self.bytes.pop();
            }
            let start = self
                .bytes
                .strip_prefix(b"\xEF\xBB\xBF")
                .unwrap_or(&self.bytes);
            if start.starts_with(b"#") || start.iter().all(u8::is_ascii_whitespace) {
                continue;
            }
            self.number += 1;
            return Ok(Some(Chunk {
                number: self.number,
                line: self.line,
                bytes: if too_long { &[] } else { &self.bytes },
                too_long,
                ended,
            }));
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn lines_are_numbered_and_comments_left_out() {
        let text = "#SMILES\tname\r\nCO\tx\r\n\n  \nCC y\nN";
        let mut reader = LineReader::new(text.as_bytes());
        let mut seen = Vec::new();
        while let Some(chunk) = reader.next_chunk().unwrap() {
            let text = String::from_utf8(chunk.bytes.to_vec()).unwrap();
            seen.push((chunk.number, chunk.line, text));
        }
        let want = [(1, 2, "CO\tx"), (2, 5, "CC y"), (3, 6, "N")];
        assert_eq!(seen, want.map(|(n, l, t)| (n, l, t.to_owned())));
    }

    #[test]
    fn an_endless_line_is_passed_over() {
        let text = format!("{}\nCO z", "C".repeat(3 * LONGEST));
        let mut reader = LineReader::new(text.as_bytes());
        let first = reader.next_chunk().unwrap().unwrap();
        assert!(first.too_long && first.bytes.is_empty());
        let second = reader.next_chunk().unwrap().unwrap();
        assert_eq!(
            (second.number, second.line, second.bytes),
            (2, 2, &b"CO z"[..])
        );
    }

    #[test]
    fn files_of_lines_are_told_from_prose_and_molfiles() {
        for text in [
            "CO",
            "# x\nN[C@@H](C)C(=O)O L\n",
            "C[C@?H]\nCC\n",
            "\u{feff}c1ccccc1 b\r\nO w",
        ] {
            assert!(recognize(text.as_bytes()), "{text}");
        }
        let molfile =
            "name\n  x\n\n  1  0  0  0  0  0  0  0  0  0999 V2000\n    0.0 0.0 0.0 C\nM  END\n";
        for text in [
            "",
            "\n\n",
            "once upon a time\nthere was",
            "<html>",
            molfile,
            "smiles,name\n",
        ] {
            assert!(!recognize(text.as_bytes()), "{text}");
        }
    }
}
