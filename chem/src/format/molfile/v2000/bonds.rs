//! The bond block.

use super::super::super::lines::Lines;
use super::super::super::{Notice, ReadError, Reason};
use super::super::columns::{field, integer, words};
use super::super::finish::{BondRow, Stereo, Tables};
use super::atoms::number_error;

/// Reads `count` bonds into the tables.
pub(super) fn read(
    count: usize,
    tables: &mut Tables,
    lines: &mut Lines<'_>,
    notices: &mut Vec<Notice>,
) -> Result<(), ReadError> {
    tables.bonds.reserve(count);
    let mut loose = None;
    let mut query = None;
    for _ in 0..count {
        let number = lines.number();
        let line = lines
            .next()
            .ok_or(ReadError::line(number, Reason::EndsEarly("its last bond")))?;
        let numbers = match fixed(line) {
            Some(numbers) => numbers,
            None => {
                loose = loose.or(Some(number));
                by_words(line, number)?
            }
        };
        if numbers[5] != 0 || numbers[6] != 0 {
            query = query.or(Some(number));
        }
        let row = row(&numbers, tables.atoms.len(), number, notices)?;
        tables.bonds.push(row);
    }
    if let Some(line) = loose {
        notices.push(Notice::new(
            line,
            "columns",
            "bond lines do not stand in their columns; they were read word by word".to_owned(),
        ));
    }
    if let Some(line) = query {
        notices.push(Notice::new(
            line,
            "query-field",
            "query or reaction fields of bonds were left out".to_owned(),
        ));
    }
    twice(tables)
}

/// First and second atom, type, stereo, unused, topology, reacting center: three columns each.
fn fixed(line: &str) -> Option<[i32; 7]> {
    let mut numbers = [0; 7];
    for (i, slot) in numbers.iter_mut().enumerate() {
        let text = field(line, 3 * i, 3 * i + 3);
        if text.is_empty() {
            break;
        }
        // a number that ends before its column may be the head of one that was cut
        let cut = text.len() == 3 && text[2] == b' ' && text.iter().any(|b| *b != b' ');
        *slot = match integer(text) {
            Some(value) if i >= 4 || !cut => value,
            _ if i >= 4 => 0,
            _ => return None,
        };
    }
    // the type is never 0 by the format; a blank one is a line out of columns
    let stated = field(line, 6, 9).iter().any(|b| *b != b' ');
    stated.then_some(numbers)
}

fn by_words(line: &str, number: usize) -> Result<[i32; 7], ReadError> {
    let names = [
        "the first atom of the bond",
        "the second atom of the bond",
        "the type of the bond",
    ];
    let mut words = words(line);
    let mut numbers = [0; 7];
    for (i, slot) in numbers.iter_mut().enumerate() {
        let (start, text) = match words.next() {
            Some(word) => word,
            None if i >= 3 => break,
            None => (line.len(), ""),
        };
        let name = names
            .get(i)
            .copied()
            .unwrap_or("the stereo code of the bond");
        let value = integer(text.as_bytes()).filter(|_| !text.is_empty());
        *slot = match value {
            Some(value) => value,
            None if i >= 4 => 0,
            None => return Err(number_error(number, start, text, name)),
        };
    }
    Ok(numbers)
}

fn row(
    numbers: &[i32; 7],
    atoms: usize,
    line: usize,
    notices: &mut Vec<Notice>,
) -> Result<BondRow, ReadError> {
    let end = |i: usize| {
        let number = numbers[i];
        usize::try_from(number - 1)
            .ok()
            .filter(|n| *n < atoms)
            .ok_or(ReadError::at(
                line,
                3 * i,
                3 * i + 3,
                Reason::NoSuchAtom {
                    number: i64::from(number),
                    atoms,
                },
            ))
    };
    let ends = [end(0)?, end(1)?];
    if ends[0] == ends[1] {
        return Err(ReadError::at(line, 0, 6, Reason::Loop(ends[0] + 1)));
    }
    let kind = match numbers[2] {
        kind @ 0..=10 => kind as u8,
        other => {
            let reason = Reason::OutOfRange {
                field: "the type of the bond",
                value: i64::from(other),
                allowed: "0 to 10",
            };
            return Err(ReadError::at(line, 6, 9, reason));
        }
    };
    let stereo = match (numbers[3], kind) {
        (0, _) => Stereo::Plain,
        (1, _) => Stereo::Up,
        (6, _) => Stereo::Down,
        (4, _) | (3, 2) => Stereo::Either,
        (code, _) => {
            notices.push(Notice::new(
                line,
                "stereo-code",
                format!(
                    "stereo code {code} means nothing at the bond of atoms {} and {}; read as plain",
                    ends[0] + 1,
                    ends[1] + 1
                ),
            ));
            Stereo::Plain
        }
    };
    if kind == 2 && numbers[3] == 4 {
        notices.push(Notice::new(
            line,
            "wavy-double-bond",
            format!(
                "the wavy double bond of atoms {} and {} was read as crossed",
                ends[0] + 1,
                ends[1] + 1
            ),
        ));
    }
    Ok(BondRow {
        ends,
        kind,
        stereo,
        line,
    })
}

/// Refuses a second bond between the same two atoms.
pub(in super::super) fn twice(tables: &Tables) -> Result<(), ReadError> {
    let mut pairs: Vec<(usize, usize, usize)> = tables
        .bonds
        .iter()
        .map(|row| {
            let [a, b] = row.ends;
            (a.min(b), a.max(b), row.line)
        })
        .collect();
    pairs.sort_unstable();
    match pairs
        .windows(2)
        .find(|w| (w[0].0, w[0].1) == (w[1].0, w[1].1))
    {
        None => Ok(()),
        Some(w) => {
            let reason = Reason::Twice {
                atoms: (w[0].0 + 1, w[0].1 + 1),
                first: w[0].2,
            };
            Err(ReadError::at(w[1].2, 0, 6, reason))
        }
    }
}
