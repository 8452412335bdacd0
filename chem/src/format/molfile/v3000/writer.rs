//! Molfiles written: version 3000, lines shorter than 80 columns.

use super::super::super::lines::Lines;
use super::super::super::{GroupKind, Record, StereoGroup, WriteError};
use super::super::columns::integer;
use super::super::symbol;
use super::super::writer::{one_line, put};
use super::atoms::{is_generic, is_list};
use super::blocks::DEEPEST;
use super::extra::{END_TABLE, is_default};
use super::lines::{self, Entry, Item};
use crate::drawing::{Drawing, End, Mark};
use crate::element::Element;
use crate::molecule::{Atom, AtomIx, Molecule, Order, Radical};
use std::fmt::Write;

const PREFIX: &str = "M  V30 ";
/// Characters of an entry on one line: lines are shorter than 80.
const ROOM: usize = 79 - PREFIX.len();

/// The table of a record, from the counts line to `M  END`. Order of atoms and bonds and coordinates are
/// those of the drawing, the latter to six decimals; indices count from 1. A text shown in place of an
/// atom is written as an abbreviation of that atom. Extra lines are in the language of V3000.
///
/// # Errors
/// If something stated of an atom does not fit the format.
pub(in super::super) fn write(record: &Record, out: &mut String) -> Result<(), WriteError> {
    let m = record.drawing.molecule();
    let extra: Vec<String> = record.extra.iter().map(|line| one_line(line)).collect();
    let others = Others::of(&extra);
    let labels: Vec<String> = m
        .atoms()
        .filter_map(|a| Some((a.index() + 1, label_of(m.atom(a))?)))
        .zip(others.last_sgroup + 1..)
        .map(|((atom, text), n)| format!("{n} SUP 0 ATOMS=(1 {atom}) LABEL={}", quoted(&text)))
        .collect();
    let groups: Vec<String> = record.stereo_groups.iter().filter_map(collection).collect();
    out.push_str("  0  0  0     0  0            999 V3000\n");
    entry(out, "BEGIN CTAB");
    let counts = format!(
        "COUNTS {} {} {} {} {}",
        m.n_atoms(),
        m.n_bonds(),
        others.sgroups + labels.len(),
        others.objects,
        u8::from(record.chiral_flag)
    );
    entry(out, &counts);
    entry(out, "BEGIN ATOM");
    for a in m.atoms() {
        let text = atom(&record.drawing, a)?;
        entry(out, &text);
    }
    entry(out, "END ATOM");
    bonds(out, &record.drawing);
    kept(out, &extra, &others, &labels, &groups);
    out.push_str(END_TABLE);
    out.push('\n');
    for line in extra.iter().skip(others.n_inside + 1) {
        out.push_str(line);
        out.push('\n');
    }
    out.push_str("M  END\n");
    Ok(())
}

/// One entry, in as many lines as it needs: broken behind a blank if there is one, and a `-` put there.
fn entry(out: &mut String, text: &str) {
    let mut rest = text;
    loop {
        out.push_str(PREFIX);
        let Some((too_far, _)) = rest.char_indices().nth(ROOM) else {
            out.push_str(rest);
            out.push('\n');
            return;
        };
        let head = rest.get(..too_far).unwrap_or(rest);
        let last = head.char_indices().last().map_or(too_far, |(i, _)| i);
        let full = head.get(..last).unwrap_or(head);
        let at = full.rfind(' ').map_or(last, |i| i + 1);
        let (piece, more) = rest.split_at_checked(at).unwrap_or((rest, ""));
        out.push_str(piece);
        out.push_str("-\n");
        rest = more;
    }
}

/// A text as one word: in quotes if a reader would part it or take it for something else.
fn quoted(text: &str) -> String {
    let text = one_line(text);
    let odd = |c: char| c.is_whitespace() || "\"()[]=".contains(c);
    if !text.is_empty() && !text.contains(odd) && !text.ends_with('-') {
        return text;
    }
    format!("\"{}\"", text.replace('"', "\"\""))
}

fn atom(drawing: &Drawing, a: AtomIx) -> Result<String, WriteError> {
    let (atom, p, number) = (drawing.molecule().atom(a), drawing.point(a), a.index() + 1);
    let does_not_fit = |what| WriteError::DoesNotFit { atom: number, what };
    let z = drawing.depths().and_then(|d| d.get(a.index()).copied());
    let mut text = format!("{number} {}", type_of(atom));
    for value in [Some(p.x), Some(p.y), z] {
        text.push(' ');
        match value {
            None => text.push('0'),
            Some(value) if (-9999.9999..=99999.9999).contains(&value) => {
                coordinate(&mut text, value);
            }
            Some(_) => return Err(WriteError::TooFar(number)),
        }
    }
    put(&mut text, format_args!(" {}", atom.map));
    if atom.charge != 0 {
        put(&mut text, format_args!(" CHG={}", atom.charge));
    }
    match atom.radical {
        Radical::None => {}
        Radical::Singlet => text.push_str(" RAD=1"),
        Radical::Doublet => text.push_str(" RAD=2"),
        Radical::Triplet => text.push_str(" RAD=3"),
    }
    match atom.isotope {
        None => {}
        Some(mass @ 1..=999) => put(&mut text, format_args!(" MASS={mass}")),
        Some(_) => return Err(does_not_fit("mass number")),
    }
    match atom.valence {
        None => {}
        Some(0) => text.push_str(" VAL=-1"),
        Some(valence @ 1..=14) => put(&mut text, format_args!(" VAL={valence}")),
        Some(_) => return Err(does_not_fit("valence")),
    }
    if let Some(rest) = rest_of(atom) {
        put(&mut text, format_args!(" RGROUPS=(1 {rest})"));
    }
    Ok(text)
}

/// Up to six decimals, at least four; never minus zero.
fn coordinate(out: &mut String, value: f64) {
    // the caller has checked the range
    let millionths = (value * 1e6).round() as i64;
    let sign = if millionths < 0 { "-" } else { "" };
    let digits = millionths.unsigned_abs();
    let (whole, fraction) = (digits / 1_000_000, digits % 1_000_000);
    let start = out.len();
    put(out, format_args!("{sign}{whole}.{fraction:06}"));
    for _ in 0..2 {
        if out.ends_with('0') && out.len() > start {
            out.pop();
        }
    }
}

/// The number of a numbered rest.
fn rest_of(atom: &Atom) -> Option<u16> {
    let alias = atom.alias.as_deref()?;
    let number = symbol::rest_number(alias)?;
    (atom.element == Element::ANY).then_some(number)
}

/// The type to write: a placeholder keeps the name it has in the format, a numbered rest is `R#`.
fn type_of(atom: &Atom) -> String {
    match atom.alias.as_deref() {
        Some(_) if rest_of(atom).is_some() => "R#".to_owned(),
        Some(alias) if atom.element == Element::ANY && names_type(alias) => {
            if is_list(alias) && !alias.contains(char::is_whitespace) {
                alias.to_owned()
            } else {
                quoted(alias)
            }
        }
        _ => atom.element.symbol().to_owned(),
    }
}

/// Whether a placeholder's text can stand as its type. `L` is a list of V2000, whose elements stood
/// elsewhere; rests with names such as `R1A` are of neither version.
fn names_type(alias: &str) -> bool {
    let usual = symbol::is_placeholder(alias) && alias != "L";
    let numbered = symbol::rest_number(alias).is_some();
    let rest = alias.starts_with('R') && !matches!(alias, "R" | "R#") && !numbered;
    (usual && !rest) || is_list(alias) || is_generic(alias)
}

/// The text shown in place of an atom that its type does not say.
fn label_of(atom: &Atom) -> Option<String> {
    let alias = atom.alias.as_deref()?;
    let said = if atom.element == Element::ANY {
        names_type(alias)
    } else {
        alias == atom.element.symbol()
    };
    (!said && !alias.trim().is_empty()).then(|| one_line(alias))
}

fn bonds(out: &mut String, drawing: &Drawing) {
    let m: &Molecule = drawing.molecule();
    if m.n_bonds() == 0 {
        return;
    }
    entry(out, "BEGIN BOND");
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
            Mark::Plain => "",
            Mark::Solid(_) => " CFG=1",
            Mark::Wavy(_) | Mark::Crossed => " CFG=2",
            Mark::Hashed(_) => " CFG=3",
        };
        // the first atom is the narrow end
        let first = mark.narrow().unwrap_or(End::First);
        let [a, c] = [first, first.other()].map(|end| bond.ends[end.index()].index() + 1);
        entry(out, &format!("{} {order} {a} {c}{stereo}", b.index() + 1));
    }
    entry(out, "END BOND");
}

/// The entry of a stereo group.
fn collection(group: &StereoGroup) -> Option<String> {
    if group.atoms.is_empty() {
        return None;
    }
    let mut text = match group.kind {
        GroupKind::Absolute => "MDLV30/STEABS".to_owned(),
        GroupKind::And(n) => format!("MDLV30/STERAC{n}"),
        GroupKind::Or(n) => format!("MDLV30/STEREL{n}"),
    };
    let _ = write!(text, " ATOMS=({}", group.atoms.len());
    for a in &group.atoms {
        let _ = write!(text, " {}", a.index() + 1);
    }
    text.push(')');
    Some(text)
}

/// The extra lines of the table, with our own entries in their blocks: there should be one block of each
/// name. Collections come last, since they name what stands before.
fn kept(out: &mut String, extra: &[String], others: &Others, labels: &[String], groups: &[String]) {
    let block = |out: &mut String, name: &str, entries: &[String]| {
        if !entries.is_empty() {
            entry(out, &format!("BEGIN {name}"));
            entries.iter().for_each(|text| entry(out, text));
            entry(out, &format!("END {name}"));
        }
    };
    if others.sgroups_at.is_none() {
        block(out, "SGROUP", labels);
    }
    for (i, line) in extra.iter().enumerate().take(others.n_inside) {
        if others.sgroups_at == Some(i) {
            labels.iter().for_each(|text| entry(out, text));
        }
        if others.collections_at == Some(i) {
            groups.iter().for_each(|text| entry(out, text));
        }
        out.push_str(line);
        out.push('\n');
    }
    if others.collections_at.is_none() {
        block(out, "COLLECTION", groups);
    }
}

/// What the extra lines of a record hold, as COUNTS must say it, and where our own entries can join them.
#[derive(Debug, Default)]
struct Others {
    /// Lines of the table; one that ends it may follow, and lines behind it.
    n_inside: usize,
    sgroups: usize,
    objects: usize,
    /// The greatest index of an S-group.
    last_sgroup: usize,
    /// The line behind the beginning of the first block of S-groups.
    sgroups_at: Option<usize>,
    /// The line behind the beginning of the first block of collections.
    collections_at: Option<usize>,
    /// Names of the blocks that are open.
    open: Vec<String>,
}

impl Others {
    /// Looks through the entries: a line that another goes on with may look like the beginning of a block.
    fn of(extra: &[String]) -> Others {
        let text = extra.join("\n");
        let mut lines = Lines::new(&text, 0);
        let mut others = Others {
            n_inside: extra.len(),
            ..Others::default()
        };
        while let Some(item) = lines::next(&mut lines, &mut Vec::new()) {
            let Item::Entry(entry) = item else { continue };
            let [first, second] = entry.head();
            if others.open.is_empty() && first == "END" && second == "CTAB" {
                others.n_inside = entry.line;
                break;
            }
            others.take(&entry, &first, second, lines.number());
        }
        let n_inside = others.n_inside;
        let inside = |at: &usize| *at < n_inside;
        others.sgroups_at = others.sgroups_at.filter(inside);
        others.collections_at = others.collections_at.filter(inside);
        others
    }

    fn take(&mut self, entry: &Entry<'_>, first: &str, second: String, behind: usize) {
        let ends = |open: &[String]| open.iter().rposition(|name| *name == second);
        match first {
            "BEGIN" if self.open.is_empty() => {
                match second.as_str() {
                    "SGROUP" => self.sgroups_at = self.sgroups_at.or(Some(behind)),
                    "COLLECTION" => self.collections_at = self.collections_at.or(Some(behind)),
                    _ => {}
                }
                self.open.push(second);
                return;
            }
            // as the reader does; the block itself is one more
            "BEGIN" if self.open.len() <= DEEPEST => self.open.push(second),
            "END" => {
                if let Some(i) = ends(&self.open) {
                    self.open.truncate(i);
                }
            }
            _ => {}
        }
        match self.open.first().map(String::as_str) {
            Some("SGROUP") if !is_default(entry) => {
                let index = integer(first.as_bytes()).unwrap_or(0);
                self.sgroups += 1;
                self.last_sgroup = self.last_sgroup.max(index.unsigned_abs() as usize);
            }
            Some("OBJ3D") if !is_default(entry) => self.objects += 1,
            _ => {}
        }
    }
}
