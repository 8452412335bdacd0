//! From bytes to text: what is no text at all, and what is not in UTF-8.

use super::{Notice, ReadError, Reason};
use std::borrow::Cow;

/// The text of some bytes, without a byte order mark, and what had to be done for it.
///
/// Bytes that are no UTF-8 are taken for Latin-1, each for the character of its number: no byte is
/// lost, and the letters of western languages come out right. `line` is the number of the first line.
///
/// # Errors
/// If the bytes are UTF-16 or no text at all.
pub fn decode(bytes: &[u8], line: usize) -> Result<(Cow<'_, str>, Option<Notice>), ReadError> {
    if is_utf16(bytes) {
        return Err(ReadError::line(line, Reason::Utf16));
    }
    if has(bytes, 0) {
        return Err(ReadError::line(line, Reason::Binary));
    }
    let bytes = bytes.strip_prefix(b"\xEF\xBB\xBF").unwrap_or(bytes);
    match std::str::from_utf8(bytes) {
        Ok(text) => Ok((Cow::Borrowed(text), None)),
        Err(error) => {
            let before = bytes.get(..error.valid_up_to()).unwrap_or_default();
            let line = line + count_lines(before);
            let text: String = bytes.iter().map(|b| char::from(*b)).collect();
            let notice = Notice::new(
                line,
                "encoding",
                "the text is not UTF-8; it was read as Latin-1, and letters beyond ASCII may be wrong"
                    .to_owned(),
            );
            Ok((Cow::Owned(text), Some(notice)))
        }
    }
}

/// Whether the beginning of a file can be that of a molfile or SD file: a check that spares reading
/// all of a file that is neither.
///
/// # Errors
/// If it is empty, UTF-16, no text, or nothing in it looks like a molfile.
pub fn recognize(beginning: &[u8]) -> Result<(), ReadError> {
    let blank = |b: &u8| b.is_ascii_whitespace();
    if beginning.iter().all(blank) {
        return Err(ReadError::line(1, Reason::Empty));
    }
    if is_utf16(beginning) {
        return Err(ReadError::line(1, Reason::Utf16));
    }
    if beginning.contains(&0) {
        return Err(ReadError::line(1, Reason::Binary));
    }
    let signs: [&[u8]; 5] = [b"V2000", b"V3000", b"M  END", b"M END", b"$$$$"];
    let has_sign = beginning
        .split(|b| *b == b'\n' || *b == b'\r')
        .any(|line| line.len() < 500 && signs.iter().any(|sign| holds(line, sign)));
    let start = beginning.get(..2000).unwrap_or(beginning);
    if has_sign || super::molfile::has_counts_line(&String::from_utf8_lossy(start)) {
        Ok(())
    } else {
        Err(ReadError::line(1, Reason::NotMolfile))
    }
}

fn is_utf16(bytes: &[u8]) -> bool {
    bytes.starts_with(&[0xFF, 0xFE])
        || bytes.starts_with(&[0xFE, 0xFF])
        || matches!(bytes, [0, a, 0, b, ..] | [a, 0, b, 0, ..] if *a != 0 && *b != 0)
}

fn holds(line: &[u8], sign: &[u8]) -> bool {
    line.windows(sign.len()).any(|w| w == sign)
}

/// Whether a byte occurs in some bytes; many are looked at in one step.
fn has(bytes: &[u8], wanted: u8) -> bool {
    let in_chunk = |chunk: &[u8]| chunk.iter().fold(false, |any, b| any | (*b == wanted));
    bytes.chunks(128).any(in_chunk)
}

/// Line ends in some bytes: LF, CR LF, CR.
pub(super) fn count_lines(bytes: &[u8]) -> usize {
    if !has(bytes, b'\r') {
        // sums that fit a byte, so that sixteen bytes and more are looked at in one step
        let in_chunk = |chunk: &[u8]| chunk.iter().fold(0u8, |n, b| n + u8::from(*b == b'\n'));
        return bytes.chunks(192).map(|c| usize::from(in_chunk(c))).sum();
    }
    let mut after_cr = false;
    let mut count = 0;
    for b in bytes {
        match b {
            b'\r' => count += 1,
            b'\n' if !after_cr => count += 1,
            _ => {}
        }
        after_cr = *b == b'\r';
    }
    count
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn byte_order_marks_and_other_codes() {
        assert_eq!(decode(b"\xEF\xBB\xBFabc", 1).unwrap().0, "abc");
        let reason = |bytes: &[u8]| decode(bytes, 1).err().map(|e| e.reason);
        assert_eq!(reason(b"\xFF\xFEa\0"), Some(Reason::Utf16));
        assert_eq!(reason(b"a\0b\0"), Some(Reason::Utf16));
        assert_eq!(reason(b"PK\x03\x04\0\0"), Some(Reason::Binary));
        let (text, notice) = decode(b"x\r\nMen\xFC\n", 5).unwrap();
        assert_eq!(text, "x\r\nMen\u{fc}\n");
        assert_eq!(notice.map(|n| (n.line, n.code)), Some((6, "encoding")));
    }

    #[test]
    fn a_beginning_tells_what_a_file_is() {
        let reason = |bytes: &[u8]| recognize(bytes).err().map(|e| e.reason);
        assert_eq!(reason(b""), Some(Reason::Empty));
        assert_eq!(reason(b" \n\r\n "), Some(Reason::Empty));
        assert_eq!(
            reason(b"once upon a time\nthere\n"),
            Some(Reason::NotMolfile)
        );
        assert_eq!(reason(&[b'x'; 4000]), Some(Reason::NotMolfile));
        assert_eq!(reason(b"a\nb\n\nbroken\n$$$$\n"), None);
        assert_eq!(
            reason(b"\n\n\n  1  0\n    0.0000    0.0000    0.0000 C\n"),
            None
        );
    }

    #[test]
    fn line_ends_are_counted_once() {
        assert_eq!(count_lines(b"a\r\nb\rc\n\n"), 4);
        assert_eq!(count_lines(b"a"), 0);
    }
}
