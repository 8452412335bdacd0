//! The typed line after a step: its locants follow the atoms they mean.

use chem::drawing::Renumbering;
use chem::solve::require::Requirement;

/// The line for the atoms' new numbers; what was asked of an atom that is gone is asked no more. A
/// line whose atoms kept their numbers stays as it was typed.
pub(super) fn follow(requirement: &Requirement, map: &Renumbering) -> String {
    let stays = requirement
        .wanted
        .iter()
        .all(|(atom, _)| map.atom(*atom) == Some(*atom));
    if stays {
        return requirement.text.clone();
    }
    let mut items: Vec<_> = requirement
        .wanted
        .iter()
        .filter_map(|(atom, d)| Some((map.atom(*atom)?.index() + 1, *d)))
        .collect();
    items.sort_unstable();
    items.dedup();
    if items.is_empty() {
        return String::new();
    }
    let words: Vec<String> = items.iter().map(|(n, d)| format!("{n}{d}")).collect();
    format!("{}({})", prefix(&requirement.text), words.join(","))
}

/// What stands before the bracket (`rac-`), if no locant does.
fn prefix(text: &str) -> &str {
    match text.split_once('(') {
        Some((before, _)) if !before.contains(|c: char| c.is_ascii_digit()) => before,
        _ => "",
    }
}
