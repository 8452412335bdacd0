//! Molfiles written: version 2000, each wedge with its narrow end first.

use super::super::super::{Record, WriteError};
use super::super::symbol;
use super::super::writer::{one_line, put};
use crate::drawing::{Drawing, End, Mark};
use crate::element::Element;
use crate::molecule::{Atom, AtomIx, Molecule, Order, Radical};

/// The table of a record, from the counts line to `M  END`. Order of atoms and bonds and coordinates are
/// those of the drawing; the parity columns are 0; charges, radicals and isotopes stand in `M` lines.
/// There are at most 999 atoms and bonds.
///
/// # Errors
/// If something stated of an atom does not fit the columns.
pub(in super::super) fn write(record: &Record, out: &mut String) -> Result<(), WriteError> {
    let m = record.drawing.molecule();
    let (flag, n_atoms, n_bonds) = (u8::from(record.chiral_flag), m.n_atoms(), m.n_bonds());
    put(
        out,
        format_args!("{n_atoms:3}{n_bonds:3}  0  0{flag:3}  0  0  0  0  0999 V2000\n"),
    );
    for a in m.atoms() {
        atom_line(out, &record.drawing, a)?;
    }
    bond_lines(out, &record.drawing);
    properties(out, m)?;
    for line in &record.extra {
        out.push_str(&one_line(line));
        out.push('\n');
    }
    out.push_str("M  END\n");
    Ok(())
}

fn atom_line(out: &mut String, drawing: &Drawing, a: AtomIx) -> Result<(), WriteError> {
    let (atom, p, number) = (drawing.molecule().atom(a), drawing.point(a), a.index() + 1);
    let z = drawing
        .depths()
        .and_then(|d| d.get(a.index()).copied())
        .unwrap_or(0.0);
    for value in [p.x, p.y, z] {
        if !(-9999.9999..=99999.9999).contains(&value) {
            return Err(WriteError::TooFar(number));
        }
        coordinate(out, value);
    }
    let valence = match atom.valence {
        None => 0,
        Some(0) => 15,
        Some(v @ 1..=14) => v,
        Some(_) => {
            return Err(WriteError::DoesNotFit {
                atom: number,
                what: "valence",
            });
        }
    };
    if atom.map > 999 {
        return Err(WriteError::DoesNotFit {
            atom: number,
            what: "mapping number",
        });
    }
    let (symbol, map) = (symbol_of(atom), atom.map);
    put(
        out,
        format_args!(" {symbol:3} 0  0  0  0  0{valence:3}  0  0  0{map:3}  0  0\n"),
    );
    Ok(())
}

/// Ten columns, four decimals; by whole numbers, which is faster than printing floats. Never minus zero.
fn coordinate(out: &mut String, value: f64) {
    // the caller has checked the range
    let ten_thousandths = (value * 1e4).round() as i64;
    let digits = ten_thousandths.unsigned_abs();
    let (whole, fraction) = (digits / 10_000, digits % 10_000);
    let sign = if ten_thousandths < 0 { "-" } else { "" };
    let blanks = 5usize.saturating_sub(sign.len() + n_digits(whole));
    out.extend(std::iter::repeat_n(' ', blanks));
    out.push_str(sign);
    put(out, format_args!("{whole}.{fraction:04}"));
}

fn n_digits(n: u64) -> usize {
    n.checked_ilog10().map_or(1, |log| log as usize + 1)
}

/// The symbol to write: a placeholder keeps the name it has in the format, a numbered rest is `R#`.
fn symbol_of(atom: &Atom) -> &str {
    match atom.alias.as_deref() {
        Some(alias) if atom.element == Element::ANY && symbol::is_placeholder(alias) => {
            if symbol::rest_number(alias).is_some() {
                "R#"
            } else {
                alias
            }
        }
        _ => atom.element.symbol(),
    }
}

fn bond_lines(out: &mut String, drawing: &Drawing) {
    let m = drawing.molecule();
    for b in m.bonds() {
        let bond = m.bond(b);
        let order = match bond.order {
            Order::Single => 1,
            Order::Double => 2,
            Order::Triple => 3,
            Order::Special(kind) => kind,
        };
        let mark = drawing.mark(b);
        let stereo = match mark {
            Mark::Plain => 0,
            Mark::Solid(_) => 1,
            Mark::Hashed(_) => 6,
            Mark::Wavy(_) => 4,
            Mark::Crossed => 3,
        };
        // the first atom of the line is the narrow end
        let first = mark.narrow().unwrap_or(End::First);
        let [a, c] = [first, first.other()].map(|end| bond.ends[end.index()].index() + 1);
        put(
            out,
            format_args!("{a:3}{c:3}{order:3}{stereo:3}  0  0  0\n"),
        );
    }
}

fn properties(out: &mut String, m: &Molecule) -> Result<(), WriteError> {
    let mut lists: [(&str, Vec<(usize, i32)>); 4] =
        ["CHG", "RAD", "ISO", "RGP"].map(|tag| (tag, Vec::new()));
    for a in m.atoms() {
        let (atom, number) = (m.atom(a), a.index() + 1);
        let radical = match atom.radical {
            Radical::None => 0,
            Radical::Singlet => 1,
            Radical::Doublet => 2,
            Radical::Triplet => 3,
        };
        let isotope = i32::from(atom.isotope.unwrap_or(0));
        if isotope > 999 {
            return Err(WriteError::DoesNotFit {
                atom: number,
                what: "mass number",
            });
        }
        let rest = match atom.alias.as_deref() {
            Some(alias) if atom.element == Element::ANY => symbol::rest_number(alias).unwrap_or(0),
            _ => 0,
        };
        let values = [i32::from(atom.charge), radical, isotope, i32::from(rest)];
        for ((_, list), value) in lists.iter_mut().zip(values) {
            if value != 0 {
                list.push((number, value));
            }
        }
        if let Some(alias) = atom.alias.as_deref()
            && symbol_of(atom) == atom.element.symbol()
            && alias != atom.element.symbol()
        {
            put(out, format_args!("A  {number:3}\n{}\n", one_line(alias)));
        }
    }
    for (tag, list) in &lists {
        for eight in list.chunks(8) {
            put(out, format_args!("M  {tag}{:3}", eight.len()));
            for (number, value) in eight {
                put(out, format_args!(" {number:3} {value:3}"));
            }
            out.push('\n');
        }
    }
    Ok(())
}
