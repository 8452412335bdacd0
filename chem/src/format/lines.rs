//! Lines of a text with any line end: LF, CR LF, CR, also mixed.

/// The first byte that is one of two, looked for in eight bytes at a time: finding the ends of lines is a
/// third of the work of reading a molfile.
pub(super) fn position(bytes: &[u8], one: u8, other: u8) -> Option<usize> {
    const LOW: u64 = u64::from_le_bytes([0x01; 8]);
    const HIGH: u64 = u64::from_le_bytes([0x80; 8]);
    let (one_all, other_all) = (LOW * u64::from(one), LOW * u64::from(other));
    let (words, rest) = bytes.as_chunks::<8>();
    for (i, word) in words.iter().enumerate() {
        let word = u64::from_le_bytes(*word);
        // the lowest high bit that is left marks the first byte that has become zero
        let (x, y) = (word ^ one_all, word ^ other_all);
        let zero = ((x.wrapping_sub(LOW) & !x) | (y.wrapping_sub(LOW) & !y)) & HIGH;
        if zero != 0 {
            return Some(8 * i + (zero.trailing_zeros() / 8) as usize);
        }
    }
    let hit = |b: &u8| *b == one || *b == other;
    rest.iter().position(hit).map(|i| 8 * words.len() + i)
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
