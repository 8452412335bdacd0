//! The atom block: index, type, x, y, z, mapping number, keywords.

use super::super::super::{Notice, ReadError, Reason};
use super::super::columns::decimal;
use super::super::finish::{AtomLines, Tables};
use super::super::symbol::{self, Symbol};
use super::super::v2000;
use super::lines::{Entry, Word, Words};
use super::{LeftOut, keyword, missing, out_of_range, whole};
use crate::element::Element;
use crate::geom::Point;
use crate::molecule::{Atom, Radical};

/// Keywords of search and reactions, as in V2000.
const QUERY: [&str; 7] = [
    "HCOUNT", "SUBST", "UNSAT", "RBCNT", "STBOX", "INVRET", "EXACHG",
];

/// Which atom has which index.
#[derive(Debug, Default)]
pub(super) struct Indices {
    /// Index, place in the table and line, sorted by index.
    list: Vec<(u32, usize, usize)>,
    /// Whether the indices are 1, 2, 3 ... in the order of the table.
    pub(super) in_order: bool,
}

impl Indices {
    /// The place in the table of the atom with an index.
    pub(super) fn find(&self, index: i32) -> Option<usize> {
        let index = u32::try_from(index).ok()?;
        if self.in_order {
            return (index as usize)
                .checked_sub(1)
                .filter(|i| *i < self.list.len());
        }
        let at = self.list.binary_search_by_key(&index, |entry| entry.0);
        at.ok().and_then(|i| self.list.get(i)).map(|entry| entry.1)
    }

    /// Sorts the list and sees to indices that occur twice. Where the first of two atoms stands at its own
    /// number and the second at a number that no atom has, the second is a slip for that number; else it
    /// is open which of them is meant by the index.
    fn settle(
        &mut self,
        entries: &[Entry<'_>],
        notices: &mut Vec<Notice>,
    ) -> Result<(), ReadError> {
        let at_home = |(index, place, _): &(u32, usize, usize)| *index as usize == place + 1;
        self.list.sort_unstable();
        let mut slips = Vec::new();
        for (i, w) in self
            .list
            .windows(2)
            .enumerate()
            .filter(|(_, w)| w[0].0 == w[1].0)
        {
            let (index, place, line) = w[1];
            let own = u32::try_from(place + 1).unwrap_or(u32::MAX);
            let free = self
                .list
                .binary_search_by_key(&own, |entry| entry.0)
                .is_err();
            if !at_home(&w[0]) || !free {
                let entry = &entries[place];
                let end = entry.words().next().map_or(0, |w| w.at + w.text.len());
                let first = w[0].2;
                return Err(entry.error(0, end, Reason::IndexTwice { index, first }));
            }
            slips.push((i + 1, own));
            notices.push(Notice::new(
                line,
                "index-twice",
                format!("a second atom with the index {index} was read as atom {own}, which it is in the order of the file and no other is"),
            ));
        }
        for (i, own) in slips {
            self.list[i].0 = own;
        }
        self.list.sort_unstable();
        self.in_order = self.list.iter().all(at_home);
        Ok(())
    }

    /// Why an index is refused that no atom has.
    pub(super) fn none(&self, index: i32) -> Reason {
        let number = i64::from(index);
        if self.in_order {
            Reason::NoSuchAtom {
                number,
                atoms: self.list.len(),
            }
        } else {
            Reason::NoSuchIndex(number)
        }
    }
}

/// Reads the atoms into the tables.
pub(super) fn read(
    entries: &[Entry<'_>],
    tables: &mut Tables,
    notices: &mut Vec<Notice>,
) -> Result<Indices, ReadError> {
    let mut indices = Indices {
        list: Vec::with_capacity(entries.len()),
        in_order: true,
    };
    tables.atom_lines = AtomLines::Each(entries.iter().map(|entry| entry.line).collect());
    let mut block = Block {
        query: None,
        left_out: LeftOut::default(),
        notices,
    };
    for (i, entry) in entries.iter().enumerate() {
        let index = block.atom(entry, tables)?;
        indices.list.push((index, i, entry.line));
    }
    let Block {
        query, left_out, ..
    } = block;
    if let Some(line) = query {
        notices.push(Notice::new(
            line,
            "query-field",
            "query or reaction fields of atoms were left out".to_owned(),
        ));
    }
    left_out.tell("atoms", notices);
    indices.settle(entries, notices)?;
    Ok(indices)
}

/// What is gathered while the atoms are read.
struct Block<'n> {
    /// First line with a query field.
    query: Option<usize>,
    left_out: LeftOut,
    notices: &'n mut Vec<Notice>,
}

impl Block<'_> {
    /// One atom; its index.
    fn atom(&mut self, entry: &Entry<'_>, tables: &mut Tables) -> Result<u32, ReadError> {
        let mut words = entry.words();
        let field = "the index of the atom";
        let word = words.next().ok_or_else(|| missing(entry, field))?;
        let number = whole(entry, &word, field)?;
        let index = u32::try_from(number)
            .map_err(|_| out_of_range(entry, &word, field, number, "1 and up"))?;
        let atom = self.kind(entry, &mut words)?;
        let names = [
            "the x of the atom",
            "the y of the atom",
            "the z of the atom",
        ];
        let mut at = [0.0; 3];
        for (slot, field) in at.iter_mut().zip(names) {
            let word = words.next().ok_or_else(|| missing(entry, field))?;
            *slot = decimal(word.text.as_bytes()).ok_or_else(|| {
                let text = word.text.to_owned();
                entry.error_at(&word, Reason::Number { field, text })
            })?;
        }
        let place = tables.atoms.len();
        tables.atoms.push(atom);
        tables.points.push(Point::new(at[0], at[1]));
        tables.depths.push(at[2]);
        let mut rest = words.peekable();
        if let Some(word) = rest.next_if(|word| word.keyword().is_none()) {
            let field = "the mapping number of the atom";
            let value = whole(entry, &word, field)?;
            tables.atoms[place].map = u16::try_from(value)
                .map_err(|_| out_of_range(entry, &word, field, value, "0 to 65535"))?;
        }
        for word in rest {
            let (key, value) = keyword(entry, &word)?;
            self.keyword(entry, key, &value, place, tables)?;
        }
        Ok(index)
    }

    /// The atom that the type names.
    fn kind(&mut self, entry: &Entry<'_>, words: &mut Words<'_>) -> Result<Atom, ReadError> {
        let field = "the symbol of the atom";
        let word = words.next().ok_or_else(|| missing(entry, field))?;
        let mut text = word.unquoted().trim().to_owned();
        if text.eq_ignore_ascii_case("NOT") {
            let mut ahead = words.clone();
            if let Some(list) = ahead.next().filter(|w| w.text.starts_with('[')) {
                text += list.text;
                *words = ahead;
            }
        }
        let placeholder = |text: &str| Atom {
            alias: Some(text.into()),
            ..Atom::new(Element::ANY)
        };
        if is_list(&text) {
            return Ok(placeholder(&text));
        }
        Ok(match symbol::understand(&text) {
            Ok(Symbol::Element(element)) => Atom::new(element),
            Ok(Symbol::Capitals(element)) => {
                let read = format!("'{text}' was read as {}", element.symbol());
                self.notices.push(Notice::new(entry.line, "capitals", read));
                Atom::new(element)
            }
            Ok(Symbol::Hydrogen(mass)) => Atom {
                isotope: Some(mass),
                ..Atom::new(Element::H)
            },
            Ok(Symbol::Placeholder) => placeholder(&text),
            Err(_) if is_generic(&text) => placeholder(&text),
            Err(perhaps) => {
                let symbol = text;
                let reason = Reason::UnknownElement { symbol, perhaps };
                return Err(entry.error_at(&word, reason));
            }
        })
    }

    fn keyword(
        &mut self,
        entry: &Entry<'_>,
        key: String,
        value: &Word<'_>,
        place: usize,
        tables: &mut Tables,
    ) -> Result<(), ReadError> {
        let atom = &mut tables.atoms[place];
        match key.as_str() {
            "CHG" => {
                let field = "a charge";
                let number = whole(entry, value, field)?;
                atom.charge = i8::try_from(number)
                    .ok()
                    .filter(|c| (-15..=15).contains(c))
                    .ok_or_else(|| out_of_range(entry, value, field, number, "-15 to 15"))?;
            }
            "RAD" => {
                let field = "a radical";
                let number = whole(entry, value, field)?;
                atom.radical = match number {
                    0 => Radical::None,
                    1 => Radical::Singlet,
                    2 => Radical::Doublet,
                    3 => Radical::Triplet,
                    other => return Err(out_of_range(entry, value, field, other, "0 to 3")),
                };
            }
            "MASS" => self.mass(entry, value, place, tables)?,
            "VAL" => {
                let field = "the valence of the atom";
                let number = whole(entry, value, field)?;
                atom.valence = match number {
                    0 => None,
                    -1 => Some(0),
                    v @ 1..=14 => Some(v as u8),
                    v => return Err(out_of_range(entry, value, field, v, "-1 to 14")),
                };
            }
            "RGROUPS" => match rest_name(value) {
                Some(name)
                    if atom
                        .alias
                        .as_deref()
                        .is_some_and(|a| a == "R#" || a == name) =>
                {
                    atom.alias = Some(name.into());
                }
                _ => self.left_out.add(key, entry.line),
            },
            // parity: it is no mark, and readers are told to pass over it
            "CFG" => {}
            key if QUERY.contains(&key) => {
                if value.text != "0" {
                    self.query = self.query.or(Some(entry.line));
                }
            }
            _ => self.left_out.add(key, entry.line),
        }
        Ok(())
    }

    /// The mass number of an isotope; some writers give the exact mass.
    fn mass(
        &mut self,
        entry: &Entry<'_>,
        value: &Word<'_>,
        place: usize,
        tables: &mut Tables,
    ) -> Result<(), ReadError> {
        let (field, allowed) = ("a mass number", "0 to 999");
        let text = value.unquoted();
        let number = match decimal(text.as_bytes()) {
            Some(mass) if mass.fract() != 0.0 && (0.5..999.4).contains(&mass) => {
                let number = mass.round() as i32;
                let read = format!("the mass {text} was read as the mass number {number}");
                self.notices
                    .push(Notice::new(entry.line, "mass-number", read));
                number
            }
            _ => whole(entry, value, field)?,
        };
        v2000::isotope(place, number, entry.line, tables, self.notices)
            .ok_or_else(|| out_of_range(entry, value, field, number, allowed))
    }
}

/// `R7` for the list `(1 7)` of one rest.
fn rest_name(value: &Word<'_>) -> Option<String> {
    let list: Vec<&str> = value.list().map(|w| w.text).collect();
    let name = match list.as_slice() {
        ["1", number] => format!("R{number}"),
        _ => return None,
    };
    symbol::rest_number(&name).map(|_| name)
}

/// Whether a type is a list of elements: `[C,N]`, `NOT[C,N]`.
pub(super) fn is_list(text: &str) -> bool {
    let head = text.get(..3).filter(|h| h.eq_ignore_ascii_case("NOT"));
    let list = text.get(head.map_or(0, str::len)..).unwrap_or_default();
    let list = list.trim_start();
    list.len() > 2 && list.starts_with('[') && list.ends_with(']') && !text.contains('"')
}

/// Types of search that V2000 does not have: metals, and kinds that may also be hydrogen.
pub(super) fn is_generic(text: &str) -> bool {
    matches!(text, "M" | "AH" | "QH" | "XH" | "MH")
}
