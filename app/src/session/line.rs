//! The typed line after a step: its locants follow the atoms they mean.

use chem::drawing::{Drawing, Renumbering};
use chem::molecule::AtomIx;
use chem::pipeline;
use chem::solve::line::{self, Locant, Numbered, Place};
use chem::solve::require::{Requirement, RequirementError};

/// A line understood for a drawing. While it is typed, a bracket that is still open counts as closed, so
/// that marks follow from the first descriptor on.
///
/// # Errors
/// What is wrong with the line; of an open bracket, what is wrong inside it.
pub(super) fn understand(
    text: &str,
    drawing: &Drawing,
    typing: bool,
) -> Result<Requirement, RequirementError> {
    let plain = pipeline::understand(text, drawing);
    let n = |c: char| text.matches(c).count();
    if plain.is_ok() || !typing || n('(') != n(')') + 1 {
        return plain;
    }
    pipeline::understand(&format!("{text})"), drawing)
}

/// The line for the atoms' new numbers; what was asked of an atom that is gone is asked no more. A
/// line whose atoms kept their numbers stays as it was typed, and so does one that cannot be read.
pub(super) fn follow(text: &str, map: &Renumbering) -> String {
    let Ok(mut line) = line::read(text) else {
        return text.to_owned();
    };
    let before = line.items.clone();
    line.items.retain_mut(|item| match item.locant {
        None => true,
        Some(locant) => {
            item.locant = moved(locant, map);
            item.locant.is_some()
        }
    });
    if line.items == before {
        text.to_owned()
    } else if line.items.is_empty() {
        String::new()
    } else {
        line.to_string()
    }
}

/// The locant for the new numbers; `None` if its atom is gone.
fn moved(locant: Locant, map: &Renumbering) -> Option<Locant> {
    let first = place(locant.first, map)?;
    match locant.second {
        None => Some(Locant::single(first)),
        Some(second) => Some(Locant::pair(first, place(second, map)?)),
    }
}

fn place(place: Place, map: &Renumbering) -> Option<Place> {
    let Place::Numbered(numbered) = place else {
        return Some(place);
    };
    let mut after = numbered;
    after.other = None;
    if after != Numbered::plain(numbered.number) {
        // no number of an atom
        return Some(place);
    }
    after.number = number(numbered.number, map)?;
    if let Some(mut other) = numbered.other {
        other.number = number(other.number, map)?;
        after.other = Some(other);
    }
    Some(Place::Numbered(after))
}

fn number(before: u32, map: &Renumbering) -> Option<u32> {
    let index = usize::try_from(before).ok()?.checked_sub(1)?;
    let after = map.atom(AtomIx::new(index))?.index() + 1;
    u32::try_from(after).ok()
}

#[cfg(test)]
mod tests {
    use super::*;
    use chem::drawing::Edit;
    use chem::element::Element;
    use chem::geom::Point;
    use chem::molecule::Atom;

    /// Where five atoms go when the one numbered `gone` is removed.
    fn without(gone: usize) -> Renumbering {
        let add = |i: u8| Edit::AddAtom(Atom::new(Element::C), Point::new(f64::from(i), 0.0));
        let edits: Vec<Edit> = (0..5).map(add).collect();
        let (five, _) = Drawing::empty().apply(&edits).unwrap();
        let edit = Edit::RemoveAtom(AtomIx::new(gone - 1));
        five.apply(&[edit]).unwrap().1
    }

    #[test]
    fn numbers_follow_and_what_is_gone_is_left_out() {
        for (text, gone, after) in [
            ("(2S,4R)", 1, "(1S,3R)"),
            ("(2S,4R)", 2, "(3R)"),
            ("(2S,4R)", 5, "(2S,4R)"),
            (" 2S, 3E ", 5, " 2S, 3E "),
            ("rac-(2S)", 1, "rac-(1S)"),
            ("2(3)E", 1, "(1(2)E)"),
            ("2(3)E", 3, ""),
            ("(2S)", 2, ""),
            ("R", 1, "R"),
            ("(2S,?", 1, "(2S,?"),
            ("(0R)", 1, "(0R)"),
        ] {
            assert_eq!(follow(text, &without(gone)), after, "{text} without {gone}");
        }
    }
}
