//! Entries of a V3000 table: lines without their prefix, continued ones joined, parted into words.
//!
//! A line whose last character is `-` goes on in the next: the `-` and the next prefix are dropped and
//! nothing is put between, also inside of lists and quotes. Blanks behind the `-` are passed over.

use super::super::super::lines::Lines;
use super::super::super::{Notice, ReadError, Reason};
use std::borrow::Cow;

/// One entry of a table.
#[derive(Clone, Debug)]
pub(super) struct Entry<'a> {
    text: Cow<'a, str>,
    /// Number of its first line in the file.
    pub(super) line: usize,
    /// Bytes of that line before the text.
    indent: usize,
    /// Where each further line was joined.
    joints: Vec<Joint>,
    /// The lines of the file from its first on.
    lines: Lines<'a>,
    /// Whether it ends in a `-` after which no line goes on.
    cut: bool,
}

#[derive(Clone, Copy, Debug)]
struct Joint {
    /// Byte of the joined text at which the line begins.
    from: usize,
    line: usize,
    indent: usize,
}

/// What comes next in a table.
#[derive(Debug)]
pub(super) enum Item<'a> {
    /// An entry.
    Entry(Entry<'a>),
    /// The line that ends the molfile, as it stands.
    End(&'a str),
    /// Another line without the prefix.
    Stray(&'a str),
}

/// The text of a line behind `M  V30 `, and where in the line it begins. Other numbers of blanks are let
/// pass, since nothing else can be meant.
fn strip(line: &str) -> Option<(usize, &str)> {
    let rest = match line.strip_prefix("M  V30") {
        Some(rest) => rest,
        None => {
            let rest = line.trim_start().strip_prefix('M')?;
            if !rest.starts_with([' ', '\t']) {
                return None;
            }
            rest.trim_start().strip_prefix("V30")?
        }
    };
    let body = match rest.strip_prefix([' ', '\t']) {
        Some(body) => body,
        None if rest.is_empty() => rest,
        None => return None,
    };
    Some((line.len() - body.len(), body))
}

/// Whether the next line is one of a V3000 table.
pub(super) fn has_prefix(lines: &Lines<'_>) -> bool {
    lines.peek().and_then(strip).is_some()
}

/// The next item; `None` at the end of the text.
pub(super) fn next<'a>(lines: &mut Lines<'a>, notices: &mut Vec<Notice>) -> Option<Item<'a>> {
    let (start, number) = (lines.clone(), lines.number());
    let line = lines.next()?;
    let Some((indent, body)) = strip(line) else {
        let end = line.starts_with("M  END") || line.trim_end() == "M END";
        return Some(if end {
            Item::End(line)
        } else {
            Item::Stray(line)
        });
    };
    let mut entry = Entry {
        text: Cow::Borrowed(body.trim_end()),
        line: number,
        indent,
        joints: Vec::new(),
        lines: start,
        cut: false,
    };
    while entry.text.ends_with('-') {
        let number = lines.number();
        let more = lines.peek().and_then(strip);
        let text = entry.text.to_mut();
        text.pop();
        let Some((indent, body)) = more else {
            text.truncate(text.trim_end_matches(['-', ' ']).len());
            entry.cut = true;
            let text = "the line ends with '-', but no line goes on from it";
            notices.push(Notice::new(number - 1, "continuation", text.to_owned()));
            break;
        };
        entry.joints.push(Joint {
            from: text.len(),
            line: number,
            indent,
        });
        text.push_str(body.trim_end());
        lines.next();
        if body.trim_end().is_empty() {
            break;
        }
    }
    Some(Item::Entry(entry))
}

impl Entry<'_> {
    /// Its words.
    pub(super) fn words(&self) -> Words<'_> {
        Words {
            text: &self.text,
            at: 0,
        }
    }

    /// Its first two words in capitals, empty where there are none: `BEGIN`, `ATOM`.
    pub(super) fn head(&self) -> [String; 2] {
        let mut words = self.words();
        [(), ()].map(|()| words.next().map_or("", |w| w.text).to_ascii_uppercase())
    }

    /// Number of bytes of its text.
    pub(super) fn len(&self) -> usize {
        self.text.len()
    }

    /// The lines of the file that it stands on, as they are; one that ends in a stray `-` without it,
    /// so that it does not go on in what is written behind it.
    pub(super) fn raw(&self) -> Vec<String> {
        if self.cut {
            return vec![format!("M  V30 {}", self.text)];
        }
        let lines = self.lines.clone().take(1 + self.joints.len());
        lines.map(str::to_owned).collect()
    }

    /// An error in the bytes `at..end` of the text.
    pub(super) fn error(&self, at: usize, end: usize, reason: Reason) -> ReadError {
        let first = Joint {
            from: 0,
            line: self.line,
            indent: self.indent,
        };
        let joint = self.joints.iter().rev().find(|j| j.from <= at);
        let joint = joint.copied().unwrap_or(first);
        // a word may go on in the next line; its place is where it begins
        let next = self.joints.iter().find(|j| j.from > at);
        let end = next.map_or(end, |j| end.min(j.from));
        let column = |byte: usize| byte - joint.from + joint.indent;
        ReadError::at(joint.line, column(at), column(end.max(at)), reason)
    }

    /// An error in a word.
    pub(super) fn error_at(&self, word: &Word<'_>, reason: Reason) -> ReadError {
        self.error(word.at, word.at + word.text.len(), reason)
    }
}

/// A word of an entry, quotes and all.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Word<'e> {
    /// Byte of the entry at which it begins.
    pub(super) at: usize,
    /// As it stands.
    pub(super) text: &'e str,
}

impl<'e> Word<'e> {
    /// Keyword in capitals and value of `KEY=value`.
    pub(super) fn keyword(&self) -> Option<(String, Word<'e>)> {
        let (key, value) = self.text.split_once('=')?;
        if key.is_empty() || key.contains('"') {
            return None;
        }
        let value = Word {
            at: self.at + key.len() + 1,
            text: value,
        };
        Some((key.to_ascii_uppercase(), value))
    }

    /// Without quotes around it; `""` inside of them is one quote.
    pub(super) fn unquoted(&self) -> Cow<'e, str> {
        match self.text.strip_prefix('"') {
            None => Cow::Borrowed(self.text),
            Some(rest) => {
                let inner = rest.strip_suffix('"').unwrap_or(rest);
                Cow::Owned(inner.replace("\"\"", "\""))
            }
        }
    }

    /// The words of a list `(n a b c)`; those of a value without brackets as well.
    pub(super) fn list(&self) -> Words<'e> {
        let inner = self.text.strip_prefix('(').unwrap_or(self.text);
        let inner = inner.strip_suffix(')').unwrap_or(inner);
        Words { text: inner, at: 0 }
    }
}

/// Words parted by blanks; blanks in quotes and in brackets part nothing.
#[derive(Clone, Debug)]
pub(super) struct Words<'e> {
    text: &'e str,
    at: usize,
}

impl<'e> Iterator for Words<'e> {
    type Item = Word<'e>;

    fn next(&mut self) -> Option<Word<'e>> {
        let rest = self.text.get(self.at..)?;
        let start = self.at + rest.find(|c: char| !c.is_ascii_whitespace())?;
        let text = self.text.get(start..)?;
        let (mut quoted, mut depth, mut before) = (false, 0usize, b'=');
        let mut length = text.len();
        for (i, b) in text.bytes().enumerate() {
            match b {
                b'"' => quoted = !quoted,
                _ if quoted => {}
                // a list begins a value; a list of elements may follow NOT
                b'(' if depth > 0 || before == b'=' => depth += 1,
                b'[' => depth += 1,
                b')' | b']' => depth = depth.saturating_sub(1),
                _ if b.is_ascii_whitespace() && depth == 0 => {
                    length = i;
                    break;
                }
                _ => {}
            }
            before = b;
        }
        self.at = start + length;
        Some(Word {
            at: start,
            text: text.get(..length)?,
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn entry(text: &str) -> (Entry<'_>, Vec<Notice>) {
        let mut notices = Vec::new();
        match next(&mut Lines::new(text, 10), &mut notices) {
            Some(Item::Entry(entry)) => (entry, notices),
            other => panic!("{other:?}"),
        }
    }

    #[test]
    fn continued_lines_are_joined_with_nothing_between() {
        let cases = [
            ("M  V30 ATOMS=(1 -\nM  V30 5)\nM  V30 x", "ATOMS=(1 5)", 2),
            (
                "M  V30 AT-\r\nM  V30 OMS=(1-  \r\nM  V30  5)",
                "ATOMS=(1 5)",
                3,
            ),
            (
                "M  V30 DEFAULT -\nM  V30 MDLV30/STEABS",
                "DEFAULT MDLV30/STEABS",
                2,
            ),
            ("M  V30 a--\nM  V30 b", "a-b", 2),
            ("M V30 1 C", "1 C", 1),
            ("M  V30", "", 1),
        ];
        for (text, joined, n_lines) in cases {
            let (entry, notices) = entry(text);
            assert_eq!(entry.text, joined, "{text:?}");
            assert_eq!(entry.raw().len(), n_lines, "{text:?}");
            assert!(notices.is_empty());
        }
        let (entry, notices) = entry("M  V30 1 C -\nM  END");
        assert_eq!((entry.text.as_ref(), notices[0].line), ("1 C", 10));
        for text in ["M  V300 1", "MV30 1", "x M  V30 1"] {
            let item = next(&mut Lines::new(text, 1), &mut Vec::new());
            assert!(matches!(item, Some(Item::Stray(_))), "{text}");
        }
    }

    #[test]
    fn errors_know_line_and_column_of_a_continued_entry() {
        let (entry, _) = entry("M  V30 1 C 0 -\nM  V30 x 0 0");
        let word = entry.words().nth(3).unwrap();
        let error = entry.error_at(&word, Reason::Empty);
        assert_eq!((error.line, error.columns), (11, Some((8, 8))));
        let word = entry.words().nth(1).unwrap();
        let error = entry.error_at(&word, Reason::Empty);
        assert_eq!((error.line, error.columns), (10, Some((10, 10))));
    }

    #[test]
    fn quotes_and_brackets_hold_blanks() {
        let words = |text| {
            let text = format!("M  V30 {text}");
            let (entry, _) = entry(&text);
            entry.words().map(|w| w.text.to_owned()).collect::<Vec<_>>()
        };
        assert_eq!(words("  1  C\t0 "), ["1", "C", "0"]);
        assert_eq!(words("A=(2 1 2) B"), ["A=(2 1 2)", "B"]);
        assert_eq!(words(r#"L="a ""b"" (" x"#), [r#"L="a ""b"" (""#, "x"]);
        assert_eq!(words("3 NOT [C, N] 0"), ["3", "NOT", "[C, N]", "0"]);
        assert_eq!(words("L=a(b c"), ["L=a(b", "c"]);
        let word = Word {
            at: 4,
            text: r#"label="a ""b""""#,
        };
        let (key, value) = word.keyword().unwrap();
        assert_eq!((key.as_str(), value.at), ("LABEL", 10));
        assert_eq!(value.unquoted(), r#"a "b""#);
    }
}
