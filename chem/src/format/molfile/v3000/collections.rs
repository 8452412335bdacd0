//! Stereo collections: which of the drawn configurations are claimed, and how.
//!
//! `MDLV30/STEABS`, `MDLV30/STERACn` and `MDLV30/STERELn` with `ATOMS=(n ...)`. Met in files and read
//! here: `DEFAULT` before the name, several entries of one name, lists that are empty, and `BONDS=`,
//! which means nothing in them.

use super::super::super::{GroupKind, Notice, StereoGroup};
use super::super::columns::integer;
use super::atoms::Indices;
use super::blocks::Block;
use super::lines::{Entry, Word};
use crate::molecule::AtomIx;
use std::collections::{BTreeMap, BTreeSet};

/// The stereo groups of a table, in the order of the file. What cannot be understood of them is left
/// out with a notice: a group is a claim about the drawing, and the drawing stands without it.
pub(super) fn read(
    blocks: &[Block<'_>],
    atoms: &Indices,
    notices: &mut Vec<Notice>,
) -> Vec<StereoGroup> {
    let mut groups: Vec<StereoGroup> = Vec::new();
    let mut places: BTreeMap<GroupKind, usize> = BTreeMap::new();
    let mut first_line = None;
    for entry in blocks
        .iter()
        .filter(|block| block.name == "COLLECTION")
        .flat_map(|block| &block.entries)
    {
        let Some(kind) = kind(entry) else { continue };
        let members = members(entry, atoms, notices);
        if members.is_empty() {
            continue;
        }
        first_line = first_line.or(Some(entry.line));
        let place = *places.entry(kind).or_insert(groups.len());
        match groups.get_mut(place) {
            None => groups.push(StereoGroup {
                kind,
                atoms: members,
            }),
            Some(group) => {
                let text = format!("the stereo group {kind} stands twice; its entries were joined");
                notices.push(Notice::new(entry.line, "stereo-group-joined", text));
                group.atoms.extend(members);
            }
        }
    }
    let Some(line) = first_line else {
        return groups;
    };
    for group in &mut groups {
        let mut seen = BTreeSet::new();
        group.atoms.retain(|a| seen.insert(*a));
    }
    contradictions(&groups, line, notices);
    notices.push(Notice::new(
        line,
        "stereo-groups",
        format!(
            "stereo groups are present and kept: {}. Labels tell the isomer that is drawn",
            StereoGroup::list(&groups)
        ),
    ));
    groups
}

/// What a stereo collection claims; `None` for a collection of another kind.
pub(super) fn kind(entry: &Entry<'_>) -> Option<GroupKind> {
    let mut words = entry.words();
    let mut name = words.next()?.unquoted().to_ascii_uppercase();
    if name == "DEFAULT" {
        name = words.next()?.unquoted().to_ascii_uppercase();
    }
    let tag = name.strip_prefix("MDLV30/STE")?;
    let number = |text: &str| match text {
        "" => Some(1),
        digits if digits.bytes().all(|b| b.is_ascii_digit()) => digits.parse().ok(),
        _ => None,
    };
    match tag.get(..3)? {
        "ABS" => number(tag.get(3..)?).map(|_| GroupKind::Absolute),
        "RAC" => number(tag.get(3..)?).map(GroupKind::And),
        "REL" => number(tag.get(3..)?).map(GroupKind::Or),
        _ => None,
    }
}

/// The atoms that an entry lists.
fn members(entry: &Entry<'_>, atoms: &Indices, notices: &mut Vec<Notice>) -> Vec<AtomIx> {
    let mut list = Vec::new();
    let mut left_out = Vec::new();
    for word in entry.words() {
        match word.keyword() {
            Some((key, value)) if key == "ATOMS" => {
                listed(entry, &value, atoms, &mut list, notices);
            }
            Some((key, _)) => left_out.push(key),
            None => {}
        }
    }
    if !left_out.is_empty() {
        let text = format!(
            "{} means nothing in a stereo group and was left out",
            left_out.join(", ")
        );
        notices.push(Notice::new(entry.line, "stereo-group-keyword", text));
    }
    list
}

fn listed(
    entry: &Entry<'_>,
    value: &Word<'_>,
    atoms: &Indices,
    list: &mut Vec<AtomIx>,
    notices: &mut Vec<Notice>,
) {
    let mut words = value.list();
    let said = words.next().and_then(|w| integer(w.text.as_bytes()));
    let mut count = 0;
    let mut unknown = Vec::new();
    for word in words {
        count += 1;
        match integer(word.text.as_bytes()).and_then(|index| atoms.find(index)) {
            Some(place) => list.push(AtomIx::new(place)),
            None => unknown.push(word.text),
        }
    }
    if !unknown.is_empty() {
        let text = format!(
            "a stereo group names what is no atom: {}; left out",
            unknown.join(", ")
        );
        notices.push(Notice::new(entry.line, "stereo-group-atom", text));
    }
    if said != Some(count) || !value.text.starts_with('(') || !value.text.ends_with(')') {
        let text = format!(
            "the list of a stereo group does not say its length ({count}) or lacks a bracket; it was read as it stands"
        );
        notices.push(Notice::new(entry.line, "stereo-group-list", text));
    }
}

/// An atom in two groups: what it claims cannot be known.
fn contradictions(groups: &[StereoGroup], line: usize, notices: &mut Vec<Notice>) {
    let mut first: BTreeMap<AtomIx, GroupKind> = BTreeMap::new();
    for group in groups {
        for a in &group.atoms {
            if let Some(other) = first.insert(*a, group.kind) {
                notices.push(Notice::new(
                    line,
                    "stereo-group-contradiction",
                    format!(
                        "atom {} stands in the stereo groups {other} and {}; a place can be in one only",
                        a.index() + 1,
                        group.kind
                    ),
                ));
            }
        }
    }
}
