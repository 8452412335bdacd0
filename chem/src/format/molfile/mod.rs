//! Molfiles: the header, then the table of atoms and bonds in one of two versions.

mod columns;
mod finish;
mod need;
mod symbol;
mod v2000;
mod v3000;
mod writer;

use super::lines::Lines;
use super::{Notice, ReadError, Reason, Record, StereoGroup, Version};
use crate::drawing::Drawing;

pub use writer::write;

/// What stands below the header.
struct Body {
    drawing: Drawing,
    extra: Vec<String>,
    chiral_flag: bool,
    stereo_groups: Vec<StereoGroup>,
    version: Version,
}

/// Reads a molfile. `first_line` is the number of its first line in the file, for messages.
///
/// # Errors
/// Where the text is no molfile or leaves open what is drawn, with line, columns and a remedy.
pub fn read(text: &str, first_line: usize) -> Result<Record, ReadError> {
    let text = text.strip_prefix('\u{feff}').unwrap_or(text);
    let mut lines = Lines::new(text, first_line);
    let mut notices = Vec::new();
    let header = header(&mut lines, &mut notices)?;
    let counts_number = lines.number();
    // `header` has seen this line
    let counts = lines.next().unwrap_or_default();
    let body = if version(counts) == Some("V3000") || v3000::begins(&lines) {
        v3000::read(counts, counts_number, lines, &mut notices)?
    } else {
        v2000::read(counts, counts_number, &mut lines, &mut notices)?
    };
    let [title, program_line, comment] = header.map(str::to_owned);
    Ok(Record {
        title,
        program_line,
        comment,
        drawing: body.drawing,
        fields: Vec::new(),
        extra: body.extra,
        version: body.version,
        stereo_groups: body.stereo_groups,
        chiral_flag: body.chiral_flag,
        notices,
    })
}

/// Whether one of the first six lines is a counts line.
pub(super) fn has_counts_line(text: &str) -> bool {
    header(&mut Lines::new(text, 1), &mut Vec::new()).is_ok()
}

/// The three header lines; the counts line is the next one after them.
///
/// Files that lost or gained a header line are met: the counts line is looked for in lines 3 to 6,
/// one that names its version before one that does not.
fn header<'a>(lines: &mut Lines<'a>, notices: &mut Vec<Notice>) -> Result<[&'a str; 3], ReadError> {
    let mut ahead = lines.clone();
    let head: Vec<&str> = ahead.by_ref().take(6).collect();
    let line = |i: usize| head.get(i).copied().unwrap_or_default();
    let first = lines.number();
    let tagged = |i: &usize| version(line(*i)).is_some();
    let bare = |i: &usize| is_bare_counts(line(*i), line(*i + 1));
    let place = if tagged(&3) || is_bare_counts(line(3), line(4)) {
        3
    } else {
        [2, 4, 5]
            .into_iter()
            .find(tagged)
            .or_else(|| [2, 4, 5].into_iter().find(bare))
            .ok_or(ReadError::line(
                first + 3.min(head.len().saturating_sub(1)),
                Reason::NoCountsLine,
            ))?
    };
    for _ in 0..place {
        lines.next();
    }
    if place == 3 {
        return Ok([line(0), line(1), line(2)]);
    }
    let (text, header) = match place {
        2 if has_dimension(line(0)) => (
            "the name line is missing".to_owned(),
            ["", line(0), line(1)],
        ),
        2 => (
            "a header line is missing".to_owned(),
            [line(0), line(1), ""],
        ),
        _ => (
            format!(
                "there are {place} header lines for 3; left out: {}",
                head.get(3..place).unwrap_or_default().join(" | ")
            ),
            [line(0), line(1), line(2)],
        ),
    };
    notices.push(Notice::new(first + place, "header", text));
    Ok(header)
}

/// The version that a counts line names; it stands in columns 34 to 39, or near them.
fn version(line: &str) -> Option<&'static str> {
    let end = line.get(6..)?;
    if !line.starts_with(|c: char| c == ' ' || c == '\t' || c.is_ascii_digit()) {
        return None;
    }
    ["V2000", "V3000"].into_iter().find(|v| end.contains(v))
}

/// Whether a line without a version is a counts line: numbers only, two of them at the start, and a
/// line of an atom (or the end) after it.
fn is_bare_counts(line: &str, next: &str) -> bool {
    let plain = |b: u8| b == b' ' || b == b'\t' || b.is_ascii_digit();
    let bytes = line.trim_end().as_bytes();
    if bytes.len() < 6 && columns::words(line).count() < 2 {
        return false;
    }
    let number = |from, to| {
        let field = columns::field(line, from, to);
        columns::integer(field).is_some() && field.iter().any(u8::is_ascii_digit)
    };
    let counted = (number(0, 3) && number(3, 6)) || columns::words(line).count() >= 2;
    let followed = v2000::looks_like_atom(next) || next.starts_with("M ") || next.trim().is_empty();
    bytes.iter().all(|b| plain(*b)) && counted && followed
}

/// Whether a second header line stands here: it names the dimension in columns 21 and 22.
fn has_dimension(line: &str) -> bool {
    matches!(line.get(20..22), Some("2D" | "3D"))
}

#[cfg(test)]
mod tests;
