//! The atom block.

use super::super::super::lines::Lines;
use super::super::super::{Notice, ReadError, Reason};
use super::super::columns::{decimal, field, integer, words};
use super::super::finish::Tables;
use super::super::symbol::{self, Symbol};
use crate::element::Element;
use crate::geom::Point;
use crate::molecule::{Atom, Radical};

/// What the atom block says of charges and masses; the property block may void it.
#[derive(Clone, Copy, Debug, Default)]
pub(super) struct Code {
    pub(super) charge: i8,
    pub(super) radical: Radical,
    pub(super) isotope: Option<u16>,
}

/// A line of an atom, before its symbol is understood.
struct Row<'a> {
    at: [f64; 3],
    symbol: &'a str,
    symbol_at: usize,
    /// The numbers behind the symbol that are used.
    numbers: Numbers,
}

#[derive(Clone, Copy, Default)]
struct Numbers {
    mass: i32,
    charge: i32,
    valence: i32,
    map: i32,
    has_query: bool,
}

/// Reads `count` atoms into the tables. Codes are empty if no atom has one.
pub(super) fn read(
    count: usize,
    tables: &mut Tables,
    lines: &mut Lines<'_>,
    notices: &mut Vec<Notice>,
) -> Result<Vec<Code>, ReadError> {
    tables.atoms.reserve(count);
    tables.points.reserve(count);
    tables.depths.reserve(count);
    let mut codes = Vec::new();
    let (mut loose, mut query) = (None, None);
    for i in 0..count {
        let number = lines.number();
        let line = lines
            .next()
            .ok_or(ReadError::line(number, Reason::EndsEarly("its last atom")))?;
        let (row, symbol) = match fixed(line).map(|row| (symbol::understand(row.symbol), row)) {
            Some((Ok(symbol), row)) => (row, symbol),
            _ => {
                let row = by_words(line, number)?;
                loose = loose.or(Some(number));
                let symbol = understood(&row, number)?;
                (row, symbol)
            }
        };
        if row.numbers.has_query {
            query = query.or(Some(number));
        }
        let (atom, code) = atom(&row, symbol, number, notices)?;
        if code.charge != 0 || code.radical != Radical::None || code.isotope.is_some() {
            codes.resize(count, Code::default());
            codes[i] = code;
        }
        tables.atoms.push(atom);
        tables.points.push(Point::new(row.at[0], row.at[1]));
        tables.depths.push(row.at[2]);
    }
    if let Some(line) = loose {
        notices.push(Notice::new(
            line,
            "columns",
            "atom lines do not stand in their columns; they were read word by word".to_owned(),
        ));
    }
    if let Some(line) = query {
        notices.push(Notice::new(
            line,
            "query-field",
            "query or reaction fields of atoms were left out".to_owned(),
        ));
    }
    Ok(codes)
}

/// A line in its columns: 10.4 for x, y, z, then a blank and the symbol.
fn fixed(line: &str) -> Option<Row<'_>> {
    let x = decimal(field(line, 0, 10))?;
    let y = decimal(field(line, 10, 20))?;
    let z = decimal(field(line, 20, 30))?;
    let bytes = line.as_bytes();
    // numbers that touch are in their columns only if their points are
    let parted = |b: usize| {
        let byte = |i: usize| bytes.get(i).copied().unwrap_or(b' ');
        byte(b - 1) == b' ' || matches!(byte(b), b' ' | b'-' | b'+') || byte(b - 5) == b'.'
    };
    if *bytes.get(30)? != b' ' || !parted(10) || !parted(20) {
        return None;
    }
    let symbol = line.get(31..bytes.len().min(34))?;
    let behind = bytes.get(34..).unwrap_or_default();
    let numbers = if behind.iter().all(|b| matches!(b, b' ' | b'0')) {
        Numbers::default()
    } else {
        let value = |from, to| integer(field(line, from, to));
        // hydrogen count, stereo care, H0, inversion, exact change
        let query = [(42, 45), (45, 48), (51, 54), (63, 66), (66, 69)];
        Numbers {
            mass: value(34, 36)?,
            charge: value(36, 39)?,
            valence: value(48, 51)?,
            map: value(60, 63)?,
            has_query: query.iter().any(|(a, b)| value(*a, *b).unwrap_or(0) != 0),
        }
    };
    let left = symbol.trim_start_matches(' ');
    let symbol_at = 31 + symbol.len() - left.len();
    Some(Row {
        at: [x, y, z],
        symbol: left.trim_end_matches(' '),
        symbol_at,
        numbers,
    })
}

/// A line word by word: x, y, z, symbol, and the numbers in their usual order.
fn by_words(line: &str, number: usize) -> Result<Row<'_>, ReadError> {
    let mut words = words(line);
    let mut word = || words.next().unwrap_or((line.len(), ""));
    let mut at = [0.0; 3];
    for (slot, name) in at.iter_mut().zip([
        "the x of the atom",
        "the y of the atom",
        "the z of the atom",
    ]) {
        let (start, text) = word();
        *slot = decimal(text.as_bytes()).ok_or(number_error(number, start, text, name))?;
    }
    let (symbol_at, symbol) = word();
    if symbol.is_empty() {
        return Err(number_error(
            number,
            line.len(),
            "",
            "the symbol of the atom",
        ));
    }
    let mut list = [0; 12];
    for (i, slot) in list.iter_mut().enumerate() {
        let (start, text) = word();
        let used = matches!(i, 0 | 1 | 5 | 9);
        *slot = match integer(text.as_bytes()) {
            Some(value) => value,
            None if !used => 0,
            None => return Err(number_error(number, start, text, "a number of the atom")),
        };
    }
    let [
        mass,
        charge,
        _,
        hydrogens,
        care,
        valence,
        h0,
        _,
        _,
        map,
        inversion,
        exact,
    ] = list;
    let query = [hydrogens, care, h0, inversion, exact];
    Ok(Row {
        at,
        symbol,
        symbol_at,
        numbers: Numbers {
            mass,
            charge,
            valence,
            map,
            has_query: query.iter().any(|n| *n != 0),
        },
    })
}

pub(super) fn number_error(line: usize, at: usize, text: &str, field: &'static str) -> ReadError {
    let text = text.trim().to_owned();
    ReadError::at(line, at, at + text.len(), Reason::Number { field, text })
}

fn understood(row: &Row<'_>, number: usize) -> Result<Symbol, ReadError> {
    symbol::understand(row.symbol).map_err(|perhaps| {
        let (start, symbol) = (row.symbol_at, row.symbol.to_owned());
        let end = start + symbol.chars().count();
        ReadError::at(
            number,
            start,
            end,
            Reason::UnknownElement { symbol, perhaps },
        )
    })
}

fn atom(
    row: &Row<'_>,
    symbol: Symbol,
    line: usize,
    notices: &mut Vec<Notice>,
) -> Result<(Atom, Code), ReadError> {
    let mut atom = match symbol {
        Symbol::Element(element) => Atom::new(element),
        Symbol::Capitals(element) => {
            notices.push(Notice::new(
                line,
                "capitals",
                format!("'{}' was read as {}", row.symbol, element.symbol()),
            ));
            Atom::new(element)
        }
        Symbol::Hydrogen(mass) => Atom {
            isotope: Some(mass),
            ..Atom::new(Element::H)
        },
        Symbol::Placeholder => Atom {
            alias: Some(row.symbol.into()),
            ..Atom::new(Element::ANY)
        },
    };
    let numbers = row.numbers;
    let range = |field, value: i32, from, to, allowed| {
        let reason = Reason::OutOfRange {
            field,
            value: i64::from(value),
            allowed,
        };
        ReadError::at(line, from, to, reason)
    };
    atom.valence = match numbers.valence {
        0 => None,
        15 => Some(0),
        v @ 1..=14 => Some(v as u8),
        v => return Err(range("the valence of the atom", v, 48, 51, "0 to 15")),
    };
    atom.map = u16::try_from(numbers.map).map_err(|_| {
        range(
            "the mapping number of the atom",
            numbers.map,
            60,
            63,
            "0 to 999",
        )
    })?;
    // charge codes of the format; 4 is a radical
    let (charge, radical) = match numbers.charge {
        0 => (0, Radical::None),
        4 => (0, Radical::Doublet),
        code @ 1..=7 => (4 - code as i8, Radical::None),
        code => return Err(range("the charge code of the atom", code, 36, 39, "0 to 7")),
    };
    let isotope = match numbers.mass {
        0 => None,
        difference => {
            let mass = i32::from(atom.element.usual_mass_number()) + difference;
            let mass = u16::try_from(mass).ok().filter(|m| *m > 0);
            let bad = || {
                range(
                    "the mass difference of the atom",
                    difference,
                    34,
                    36,
                    "-3 to 4",
                )
            };
            Some(
                mass.filter(|_| atom.element != Element::ANY)
                    .ok_or_else(bad)?,
            )
        }
    };
    let code = Code {
        charge,
        radical,
        isotope,
    };
    Ok((atom, code))
}
