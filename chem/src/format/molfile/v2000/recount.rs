//! Lines told by their looks, for a counts line that does not fit.

use super::super::super::lines::Lines;
use super::super::columns::{decimal, words};

/// Whether a line looks like one of an atom: three numbers, one of them with a point, and a symbol.
pub(in super::super) fn looks_like_atom(line: &str) -> bool {
    let mut words = words(line);
    let mut points = false;
    for _ in 0..3 {
        match words.next() {
            Some((_, word)) if decimal(word.as_bytes()).is_some() => points |= word.contains('.'),
            _ => return false,
        }
    }
    let symbol = words
        .next()
        .is_some_and(|(_, w)| w.starts_with(|c: char| c.is_ascii_alphabetic() || c == '*'));
    points && symbol
}

/// Whether a line looks like one of a bond: digits and blanks only, three to seven numbers of three columns.
pub(super) fn looks_like_bond(line: &str) -> bool {
    let line = line.trim_end();
    let numbers = line.bytes().all(|b| b == b' ' || b.is_ascii_digit());
    numbers && (9..=21).contains(&line.len()) && words(line).count() <= 7
}

/// Atom lines and then bond lines, counted by their looks; `None` if other lines stand among them.
pub(super) fn recount(lines: Lines<'_>) -> Option<(usize, usize)> {
    let mut lines = lines.peekable();
    let mut atoms = 0;
    while lines.next_if(|l| looks_like_atom(l)).is_some() {
        atoms += 1;
    }
    let mut bonds = 0;
    while lines.next_if(|l| looks_like_bond(l)).is_some() {
        bonds += 1;
    }
    let ends = lines
        .peek()
        .is_none_or(|l| l.trim().is_empty() || l.starts_with(|c: char| c.is_ascii_uppercase()));
    (ends && atoms > 0).then_some((atoms, bonds))
}
