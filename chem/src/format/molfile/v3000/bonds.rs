//! The bond block: index, type, two atoms, keywords.

use super::super::super::{Notice, ReadError, Reason};
use super::super::finish::{BondRow, Stereo, Tables};
use super::super::v2000;
use super::atoms::Indices;
use super::lines::{Entry, Word};
use super::{LeftOut, keyword, missing, out_of_range, whole};

/// Reads the bonds into the tables; tells whether their indices are 1, 2, 3 ... in this order.
pub(super) fn read(
    entries: &[Entry<'_>],
    atoms: &Indices,
    tables: &mut Tables,
    notices: &mut Vec<Notice>,
) -> Result<bool, ReadError> {
    tables.bonds.reserve(entries.len());
    let mut block = Block {
        atoms,
        query: None,
        left_out: LeftOut::default(),
        notices,
    };
    let mut in_order = true;
    for (i, entry) in entries.iter().enumerate() {
        let (index, row) = block.bond(entry)?;
        in_order &= usize::try_from(index) == Ok(i + 1);
        tables.bonds.push(row);
    }
    let Block {
        query, left_out, ..
    } = block;
    if let Some(line) = query {
        notices.push(Notice::new(
            line,
            "query-field",
            "query or reaction fields of bonds were left out".to_owned(),
        ));
    }
    left_out.tell("bonds", notices);
    // the columns of V2000 mean nothing here
    v2000::twice(tables).map_err(|error| ReadError::line(error.line, error.reason))?;
    Ok(in_order)
}

/// What is gathered while the bonds are read.
struct Block<'n> {
    atoms: &'n Indices,
    /// First line with a query field.
    query: Option<usize>,
    left_out: LeftOut,
    notices: &'n mut Vec<Notice>,
}

impl Block<'_> {
    /// One bond and its index.
    fn bond(&mut self, entry: &Entry<'_>) -> Result<(i32, BondRow), ReadError> {
        let mut words = entry.words();
        let mut number = |field| {
            let word = words.next().ok_or_else(|| missing(entry, field))?;
            Ok((whole(entry, &word, field)?, word))
        };
        let (index, _) = number("the index of the bond")?;
        let field = "the type of the bond";
        let (kind, word) = number(field)?;
        let kind = u8::try_from(kind)
            .ok()
            .filter(|kind| *kind <= 10)
            .ok_or_else(|| out_of_range(entry, &word, field, kind, "0 to 10"))?;
        let mut end = |field| {
            let (index, word) = number(field)?;
            let place = self.atoms.find(index);
            let none = || entry.error_at(&word, self.atoms.none(index));
            Ok((place.ok_or_else(none)?, word))
        };
        let (first, from) = end("the first atom of the bond")?;
        let (second, to) = end("the second atom of the bond")?;
        if first == second {
            let reason = Reason::Loop(first + 1);
            return Err(entry.error(from.at, to.at + to.text.len(), reason));
        }
        let mut row = BondRow {
            ends: [first, second],
            kind,
            stereo: Stereo::Plain,
            line: entry.line,
        };
        for word in words {
            let (key, value) = keyword(entry, &word)?;
            self.keyword(entry, key, &value, &mut row)?;
        }
        Ok((index, row))
    }

    fn keyword(
        &mut self,
        entry: &Entry<'_>,
        key: String,
        value: &Word<'_>,
        row: &mut BondRow,
    ) -> Result<(), ReadError> {
        match key.as_str() {
            "CFG" => {
                let field = "the CFG of the bond";
                row.stereo = match whole(entry, value, field)? {
                    0 => Stereo::Plain,
                    1 => Stereo::Up,
                    2 => Stereo::Either,
                    3 => Stereo::Down,
                    // 4 and 6 are codes of V2000
                    other => {
                        let allowed = "0 (plain), 1 (up), 2 (either) or 3 (down)";
                        return Err(out_of_range(entry, value, field, other, allowed));
                    }
                };
            }
            "TOPO" | "RXCTR" | "STBOX" => {
                if value.text != "0" {
                    self.query = self.query.or(Some(entry.line));
                }
            }
            "ENDPTS" => self.notices.push(Notice::new(
                entry.line,
                "multicenter-bond",
                format!(
                    "the bond of atoms {} and {} goes to several atoms (ENDPTS); only the bond itself was read",
                    row.ends[0] + 1,
                    row.ends[1] + 1
                ),
            )),
            "ATTACH" => {}
            _ => self.left_out.add(key, entry.line),
        }
        Ok(())
    }
}
