//! What a V3000 table holds beside atoms, bonds and stereo groups: kept as it stands.
//!
//! It names atoms and bonds by index, so it is kept only where the indices are the numbers that
//! the drawing gives them.

use super::super::super::Notice;
use super::super::columns::integer;
use super::super::finish::Tables;
use super::atoms::Indices;
use super::blocks::{Block, Counts, Table};
use super::collections;
use super::lines::Entry;

/// The line that ends a table. In the extra lines of a record it parts those of the table from those
/// behind it.
pub(super) const END_TABLE: &str = "M  V30 END CTAB";

/// The extra lines of a table; texts that are shown in place of atoms go to the atoms.
pub(super) fn read(
    table: &Table<'_>,
    counts: &Counts,
    atoms: &Indices,
    same_numbers: bool,
    tables: &mut Tables,
    notices: &mut Vec<Notice>,
) -> Vec<String> {
    let mut lines = Vec::new();
    let mut dropped = Vec::new();
    let mut n_sgroups = 0;
    let mut first_dropped = None;
    for block in &table.others {
        let mut kept = Vec::new();
        for entry in &block.entries {
            let is_sgroup = block.name == "SGROUP" && !is_default(entry);
            n_sgroups += usize::from(is_sgroup);
            let shown = if is_sgroup { alias(entry, atoms) } else { None };
            let slot = shown.and_then(|(i, text)| Some((tables.atoms.get_mut(i)?, text)));
            if let Some((atom, text)) = slot {
                atom.alias = Some(text.into());
            } else if block.name != "COLLECTION" || collections::kind(entry).is_none() {
                kept.push(entry);
            }
        }
        let Some(first) = kept.first() else { continue };
        if same_numbers {
            keep(block, &kept, &mut lines);
        } else {
            first_dropped = first_dropped.or(Some(first.line));
            dropped.push(match block.name.as_str() {
                "" => first.head()[0].clone(),
                name => format!("{name} ({} entries)", kept.len()),
            });
        }
    }
    if n_sgroups != counts.sgroups {
        notices.push(Notice::new(
            counts.line,
            "sgroup-count",
            format!(
                "the line COUNTS says {} S-groups, but there are {n_sgroups}",
                counts.sgroups
            ),
        ));
    }
    if let Some(line) = first_dropped {
        let text = format!(
            "atoms or bonds have other numbers than the indices of the file; left out: {}",
            dropped.join(", ")
        );
        notices.push(Notice::new(line, "properties-dropped", text));
    }
    if !table.behind.is_empty() {
        lines.push(END_TABLE.to_owned());
        lines.extend(table.behind.iter().map(|line| (*line).to_owned()));
    }
    lines
}

fn keep(block: &Block<'_>, entries: &[&Entry<'_>], lines: &mut Vec<String>) {
    match (block.name.as_str(), &block.begin) {
        // our own entries may have to join these blocks
        (name @ ("SGROUP" | "COLLECTION"), _) => lines.push(format!("M  V30 BEGIN {name}")),
        (_, Some(begin)) => lines.extend(begin.raw()),
        (_, None) => {}
    }
    for entry in entries {
        lines.extend(entry.raw());
    }
    if block.begin.is_some() {
        lines.push(format!("M  V30 END {}", block.name));
    }
}

/// Whether an entry of a block states only what holds for those after it.
pub(super) fn is_default(entry: &Entry<'_>) -> bool {
    entry.head()[0] == "DEFAULT"
}

/// An abbreviation of a single atom that says nothing but its text is what V2000 calls an alias:
/// `3 SUP 0 ATOMS=(1 5) LABEL=Boc`.
fn alias(entry: &Entry<'_>, atoms: &Indices) -> Option<(usize, String)> {
    let mut words = entry.words();
    words.next()?;
    let is_abbreviation = words.next()?.text.eq_ignore_ascii_case("SUP");
    integer(words.next()?.text.as_bytes()).filter(|_| is_abbreviation)?;
    let (mut place, mut label) = (None, None);
    for word in words {
        let (key, value) = word.keyword()?;
        match key.as_str() {
            "ATOMS" => {
                let list: Vec<i32> = value
                    .list()
                    .map(|w| integer(w.text.as_bytes()))
                    .collect::<Option<_>>()?;
                let [1, index] = list.as_slice() else {
                    return None;
                };
                place = Some(atoms.find(*index)?);
            }
            "LABEL" => label = Some(value.unquoted().into_owned()),
            _ => return None,
        }
    }
    Some((place?, label.filter(|text| !text.trim().is_empty())?))
}
