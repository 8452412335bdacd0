//! Lines of a text with any line end: LF, CR LF, CR, also mixed.

/// The first byte that is one of two. Sixteen at a time, in a form that compiles to vector code: finding
/// the ends of lines is a third of the work of reading a molfile.
pub(super) fn position(bytes: &[u8], one: u8, other: u8) -> Option<usize> {
    let hit = |b: &u8| *b == one || *b == other;
    let (chunks, _) = bytes.as_chunks::<16>();
    let whole = chunks
        .iter()
        .take_while(|chunk| !chunk.iter().fold(false, |any, b| any | hit(b)))
        .count();
    let start = 16 * whole;
    let rest = bytes.get(start..).unwrap_or_default();
    rest.iter().position(hit).map(|i| start + i)
}

/// Walks over the lines of a text; knows the number of each line and where it starts.
#[derive(Clone, Debug)]
pub(super) struct Lines<'a> {
    text: &'a str,
    at: usize,
    number: usize,
}

impl<'a> Lines<'a> {
    /// The lines of `text`, whose first line is line `first` of its file.
    pub(super) fn new(text: &'a str, first: usize) -> Lines<'a> {
        Lines {
            text,
            at: 0,
            number: first,
        }
    }

    /// Number of the line that comes next.
    pub(super) fn number(&self) -> usize {
        self.number
    }

    /// Byte at which the next line starts.
    pub(super) fn at(&self) -> usize {
        self.at
    }

    /// The next line, which stays the next.
    pub(super) fn peek(&self) -> Option<&'a str> {
        self.clone().next()
    }
}

impl<'a> Iterator for Lines<'a> {
    type Item = &'a str;

    fn next(&mut self) -> Option<&'a str> {
        let bytes = self.text.as_bytes().get(self.at..)?;
        if bytes.is_empty() {
            return None;
        }
        let length = position(bytes, b'\n', b'\r').unwrap_or(bytes.len());
        let line = self.text.get(self.at..self.at + length)?;
        let ending = match bytes.get(length..) {
            Some([b'\r', b'\n', ..]) => 2,
            Some([_, ..]) => 1,
            _ => 0,
        };
        self.at += length + ending;
        self.number += 1;
        Some(line)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn bytes_are_found_where_they_are() {
        for length in 0..70 {
            let mut bytes = vec![b'x'; length];
            assert_eq!(position(&bytes, b'$', b'$'), None);
            for at in (0..length).rev() {
                bytes[at] = b'$';
                assert_eq!(position(&bytes, b'\r', b'$'), Some(at));
            }
        }
    }

    #[test]
    fn every_line_end_counts_once() {
        let mut lines = Lines::new("a\r\nb\rc\n\nd", 7);
        let mut seen = Vec::new();
        loop {
            let number = lines.number();
            let Some(line) = lines.next() else { break };
            seen.push((number, line));
        }
        assert_eq!(seen, [(7, "a"), (8, "b"), (9, "c"), (10, ""), (11, "d")]);
        assert_eq!(Lines::new("", 1).next(), None);
        assert_eq!(Lines::new("x\n", 1).count(), 1);
    }
}
