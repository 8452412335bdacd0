//! Molfiles, version 2000: fixed columns.

mod atoms;
mod bonds;
mod properties;
mod recount;
mod writer;

use super::super::lines::Lines;
use super::super::{Notice, ReadError, Reason, Version};
use super::Body;
use super::columns::{field, integer, words};
use super::finish::{AtomLines, Tables};

pub(super) use bonds::twice;
pub(super) use properties::isotope;
pub(super) use recount::looks_like_atom;
pub(super) use writer::write;

/// Numbers of the counts line.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
struct Counts {
    atoms: usize,
    bonds: usize,
    /// Obsolete atom lists, a line each.
    lists: usize,
    /// Obsolete texts, two lines each.
    texts: usize,
    chiral: bool,
}

/// Reads from the line after the counts line to the end of the table.
pub(super) fn read(
    counts_line: &str,
    number: usize,
    lines: &mut Lines<'_>,
    notices: &mut Vec<Notice>,
) -> Result<Body, ReadError> {
    let counts = counts(counts_line, number, notices)?;
    let after_counts = lines.clone();
    let mut tables = Tables {
        atom_lines: AtomLines::From(lines.number()),
        ..Tables::default()
    };
    let outcome = tables_and_properties(&counts, &mut tables, lines, notices);
    let extra = match outcome {
        Ok(extra) => extra,
        // a line that cannot be read is often one too many or one too few
        Err(error) => {
            let said = (counts.atoms, counts.bonds);
            let found = recount::recount(after_counts).filter(|found| *found != said);
            let odd_symbol = matches!(&error.reason, Reason::UnknownElement { symbol, .. }
                if symbol.starts_with(|c: char| c.is_alphabetic()));
            return Err(match found {
                Some(found) if !odd_symbol => {
                    ReadError::at(number, 0, 6, Reason::Counts { said, found })
                }
                _ => error,
            });
        }
    };
    Ok(Body {
        drawing: tables.finish(notices)?,
        extra,
        chiral_flag: counts.chiral,
        stereo_groups: Vec::new(),
        version: Version::V2000,
    })
}

fn tables_and_properties(
    counts: &Counts,
    tables: &mut Tables,
    lines: &mut Lines<'_>,
    notices: &mut Vec<Notice>,
) -> Result<Vec<String>, ReadError> {
    let codes = atoms::read(counts.atoms, tables, lines, notices)?;
    bonds::read(counts.bonds, tables, lines, notices)?;
    let obsolete = counts.lists + 2 * counts.texts;
    let in_the_way = |line: &str| !line.starts_with("M  ");
    for _ in 0..obsolete {
        let number = lines.number();
        match lines.peek() {
            Some(line) if in_the_way(line) => {
                lines.next();
                notices.push(Notice::new(
                    number,
                    "obsolete-line",
                    format!("an obsolete line was left out: {}", line.trim_end()),
                ));
            }
            _ => break,
        }
    }
    properties::read(codes, tables, lines, notices)
}

fn counts(line: &str, number: usize, notices: &mut Vec<Notice>) -> Result<Counts, ReadError> {
    let column = |i: usize| integer(field(line, 3 * i, 3 * i + 3)).filter(|n| *n >= 0);
    let optional = |i: usize| column(i).unwrap_or(0) as usize;
    if let (Some(atoms), Some(bonds), true) = (column(0), column(1), stands_in_columns(line)) {
        return Ok(Counts {
            atoms: atoms as usize,
            bonds: bonds as usize,
            lists: optional(2),
            texts: optional(5),
            chiral: optional(4) == 1,
        });
    }
    let numbers: Vec<(usize, &str)> = words(line).take(6).collect();
    let word = |i: usize, field: &'static str| {
        let (at, text) = numbers.get(i).copied().unwrap_or((line.len(), ""));
        let too_long = text.len() > 3 && text.bytes().all(|b| b.is_ascii_digit());
        let reason = if too_long {
            Reason::NeedsV3000
        } else {
            Reason::Number {
                field,
                text: text.to_owned(),
            }
        };
        let value = text.parse::<usize>().ok().filter(|n| *n <= 999);
        value.ok_or(ReadError::at(number, at, at + text.len(), reason))
    };
    let atoms = word(0, "the number of atoms")?;
    let bonds = word(1, "the number of bonds")?;
    if (column(0), column(1)) != (Some(atoms as i32), Some(bonds as i32)) {
        notices.push(Notice::new(
            number,
            "columns",
            format!("the counts line does not stand in its columns; read as {atoms} atoms and {bonds} bonds"),
        ));
    }
    let optional = |i: usize| word(i, "").unwrap_or(0);
    Ok(Counts {
        atoms,
        bonds,
        lists: optional(2),
        texts: optional(5),
        chiral: optional(4) == 1,
    })
}

/// Whether the first three numbers end where their columns end. Counts above 999 run together
/// (`10001001`) and shift the rest.
fn stands_in_columns(line: &str) -> bool {
    (0..3).all(|i| {
        let bytes = field(line, 3 * i, 3 * i + 3);
        let blank = bytes.iter().all(|b| *b == b' ');
        let right = bytes.len() == 3 && bytes.last().is_some_and(u8::is_ascii_digit);
        if i < 2 { right } else { right || blank }
    })
}
