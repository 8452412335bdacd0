//! The property block: charges, isotopes, radicals, aliases; all else is kept as it stands.

use super::super::super::lines::Lines;
use super::super::super::{Notice, ReadError, Reason};
use super::super::columns::{field, integer, words};
use super::super::finish::Tables;
use super::super::symbol;
use super::atoms::{Code, number_error};
use super::recount::{looks_like_atom, looks_like_bond};
use crate::element::Element;
use crate::molecule::Radical;

/// Pairs of atom index and value, with the line they stand in.
type Pairs = Vec<(usize, i32, usize)>;

#[derive(Default)]
struct Properties {
    charges: Option<Pairs>,
    radicals: Option<Pairs>,
    isotopes: Option<Pairs>,
    /// Numbers of rests, with the lines that said them.
    rests: Pairs,
    rest_lines: Vec<String>,
    extra: Vec<String>,
}

/// Reads to `M  END`, applies what it understands and gives back the other lines.
pub(super) fn read(
    codes: Vec<Code>,
    tables: &mut Tables,
    lines: &mut Lines<'_>,
    notices: &mut Vec<Notice>,
) -> Result<Vec<String>, ReadError> {
    let mut found = Properties::default();
    let mut ended = false;
    while !ended {
        let number = lines.number();
        let Some(line) = lines.next() else { break };
        ended = property(line, number, &mut found, tables, lines)?;
        if ended && !line.starts_with("M  END") {
            notices.push(Notice::new(
                number,
                "end-line",
                format!("'{}' was read as M  END", line.trim_end()),
            ));
        }
    }
    if !ended {
        notices.push(Notice::new(
            lines.number(),
            "no-end-line",
            "the line M  END is missing; all atoms and bonds were there".to_owned(),
        ));
    }
    apply(codes, found, tables, notices)
}

/// Takes in one property; true at the end of the block.
fn property(
    line: &str,
    number: usize,
    found: &mut Properties,
    tables: &mut Tables,
    lines: &mut Lines<'_>,
) -> Result<bool, ReadError> {
    let n_atoms = tables.atoms.len();
    let add = |list: &mut Option<Pairs>| pairs(line, number, n_atoms, list.get_or_insert_default());
    match line.get(..6).unwrap_or(line) {
        "M  CHG" => add(&mut found.charges)?,
        "M  RAD" => add(&mut found.radicals)?,
        "M  ISO" => add(&mut found.isotopes)?,
        "M  RGP" => {
            pairs(line, number, n_atoms, &mut found.rests)?;
            found.rest_lines.push(line.to_owned());
        }
        "M  END" => return Ok(true),
        _ if line.trim_end() == "M END" => return Ok(true),
        _ if line.starts_with("A  ") => alias(line, number, tables, lines)?,
        _ if line.starts_with("G  ") => {
            found.extra.push(line.to_owned());
            found.extra.extend(lines.next().map(str::to_owned));
        }
        "S  SKP" => {
            found.extra.push(line.to_owned());
            let count = integer(field(line, 6, 9)).unwrap_or(0).clamp(0, 999);
            let skipped = lines.by_ref().take(count as usize);
            found.extra.extend(skipped.map(str::to_owned));
        }
        // kept as a property it would hide the whole table of a V3000 molfile whose head is damaged
        "M  V30" => {
            let reason = Reason::Misplaced {
                found: "M  V30".to_owned(),
                expected: "a property line of V2000 or M  END",
            };
            return Err(ReadError::at(number, 0, 6, reason));
        }
        _ if line.trim().is_empty() => {}
        // an atom or a bond that the counts line does not know of
        _ if looks_like_bond(line) || looks_like_atom(line) => {
            let reason = Reason::Counts {
                said: (n_atoms, tables.bonds.len()),
                found: (n_atoms, tables.bonds.len() + 1),
            };
            return Err(ReadError::line(number, reason));
        }
        _ => found.extra.push(line.to_owned()),
    }
    Ok(false)
}

/// `A  aaa` and the text in the line after it.
fn alias(
    line: &str,
    number: usize,
    tables: &mut Tables,
    lines: &mut Lines<'_>,
) -> Result<(), ReadError> {
    let text = field(line, 3, line.len());
    let atom = integer(text).ok_or_else(|| {
        let text = line.get(3..).unwrap_or_default();
        number_error(number, 3, text, "the atom number of the alias")
    })?;
    let atoms = tables.atoms.len();
    let index = usize::try_from(atom - 1).ok();
    let slot = index
        .and_then(|i| tables.atoms.get_mut(i))
        .ok_or(ReadError::at(
            number,
            3,
            line.len(),
            Reason::NoSuchAtom {
                number: i64::from(atom),
                atoms,
            },
        ))?;
    let text = lines.next().unwrap_or_default().trim();
    if !text.is_empty() {
        slot.alias = Some(text.into());
    }
    Ok(())
}

/// `M  XXXnn8 aaa vvv ...`: in columns if they hold numbers, else word by word.
fn pairs(line: &str, number: usize, n_atoms: usize, list: &mut Pairs) -> Result<(), ReadError> {
    let count = integer(field(line, 6, 9));
    let in_columns = count.filter(|n| (1..=8).contains(n)).and_then(|count| {
        let mut found = [(0, 0); 8];
        for (k, slot) in found.iter_mut().enumerate().take(count as usize) {
            let at = 9 + 8 * k;
            let (atom, value) = (field(line, at, at + 4), field(line, at + 4, at + 8));
            if value.iter().all(|b| *b == b' ') {
                return None;
            }
            *slot = (integer(atom)?, integer(value)?);
        }
        Some((found, count as usize))
    });
    let mut push = |atom: i32, value: i32, at: usize| {
        let index = usize::try_from(atom - 1).ok().filter(|i| *i < n_atoms);
        let reason = Reason::NoSuchAtom {
            number: i64::from(atom),
            atoms: n_atoms,
        };
        let index = index.ok_or(ReadError::at(number, at, at + 4, reason))?;
        list.push((index, value, number));
        Ok(())
    };
    if let Some((found, count)) = in_columns {
        for (k, (atom, value)) in found.iter().take(count).enumerate() {
            push(*atom, *value, 9 + 8 * k)?;
        }
        return Ok(());
    }
    let rest = line.get(6..).unwrap_or_default();
    let mut words = words(rest);
    let mut word = |name| {
        let (at, text) = words.next().unwrap_or((rest.len(), ""));
        let value = integer(text.as_bytes()).filter(|_| !text.is_empty());
        value
            .map(|v| (v, 6 + at))
            .ok_or(number_error(number, 6 + at, text, name))
    };
    let (count, _) = word("the number of entries")?;
    for _ in 0..count.clamp(0, 999) {
        let (atom, at) = word("an atom number of the property line")?;
        let (value, _) = word("a value of the property line")?;
        push(atom, value, at)?;
    }
    Ok(())
}

/// Puts charges, radicals and isotopes on the atoms. A line of charges or radicals voids what the atom
/// block says of both, one of isotopes its mass differences (CTfile Formats 2020, p. 49).
fn apply(
    codes: Vec<Code>,
    found: Properties,
    tables: &mut Tables,
    notices: &mut Vec<Notice>,
) -> Result<Vec<String>, ReadError> {
    let charged = found.charges.is_some() || found.radicals.is_some();
    for (atom, code) in tables.atoms.iter_mut().zip(codes) {
        if !charged {
            atom.charge = code.charge;
            atom.radical = code.radical;
        }
        if found.isotopes.is_none() && code.isotope.is_some() {
            atom.isotope = code.isotope;
        }
    }
    let wrong = |field, value: i32, line, allowed| {
        let value = i64::from(value);
        let reason = Reason::OutOfRange {
            field,
            value,
            allowed,
        };
        ReadError::line(line, reason)
    };
    for (i, value, line) in found.charges.unwrap_or_default() {
        tables.atoms[i].charge = i8::try_from(value)
            .ok()
            .filter(|c| (-15..=15).contains(c))
            .ok_or(wrong("a charge", value, line, "-15 to 15"))?;
    }
    for (i, value, line) in found.radicals.unwrap_or_default() {
        tables.atoms[i].radical = match value {
            0 => Radical::None,
            1 => Radical::Singlet,
            2 => Radical::Doublet,
            3 => Radical::Triplet,
            _ => return Err(wrong("a radical", value, line, "0 to 3")),
        };
    }
    for (i, value, line) in found.isotopes.unwrap_or_default() {
        isotope(i, value, line, tables, notices).ok_or(wrong(
            "a mass number",
            value,
            line,
            "0 to 999",
        ))?;
    }
    let mut extra = rests(found.rests, found.rest_lines, tables);
    extra.extend(found.extra);
    Ok(extra)
}

/// Puts a mass number on an atom, with a notice if it is an unlikely one; `None` if it is none at all.
pub(in super::super) fn isotope(
    index: usize,
    value: i32,
    line: usize,
    tables: &mut Tables,
    notices: &mut Vec<Notice>,
) -> Option<()> {
    let mass = u16::try_from(value).ok().filter(|m| *m <= 999)?;
    let atom = &mut tables.atoms[index];
    atom.isotope = (mass != 0).then_some(mass);
    let difference = value - i32::from(atom.element.usual_mass_number());
    // the range that the format allows
    let unlikely = mass != 0 && !(-18..=12).contains(&difference);
    if unlikely && atom.element != Element::ANY {
        notices.push(Notice::new(
            line,
            "mass-number",
            format!(
                "atom {} ({}) has the mass number {mass}, far from the usual one",
                index + 1,
                atom.element.symbol()
            ),
        ));
    }
    Some(())
}

/// Names rests by their numbers (`R2` for `R#`); the lines stay as they are if one of them does not fit.
fn rests(rests: Pairs, lines: Vec<String>, tables: &mut Tables) -> Vec<String> {
    let names_rest = |(i, value, _): &(usize, i32, usize)| {
        let atom = &tables.atoms[*i];
        let alias = atom.alias.as_deref().unwrap_or_default();
        let agrees = match symbol::rest_number(alias) {
            Some(number) => i32::from(number) == *value,
            None => matches!(alias, "R" | "R#"),
        };
        atom.element == Element::ANY && agrees && (1..=999).contains(value)
    };
    if !rests.iter().all(names_rest) {
        return lines;
    }
    for (i, value, _) in rests {
        tables.atoms[i].alias = Some(format!("R{value}").into());
    }
    Vec::new()
}
