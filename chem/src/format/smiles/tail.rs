//! The tail of a line, `|...|`: groups of centres and places on the sheet.
//!
//! An extension that its inventor published and open libraries read; not part of OpenSMILES. Fields are
//! parted by commas, and so are the numbers in them: a piece that begins with a digit belongs to the field
//! before. Atom numbers count from 0 in the order of the line. What is not read here is told.

use super::error::{Fault, SmilesError};
use crate::format::{GroupKind, Notice, StereoGroup};
use crate::geom::Point;
use crate::molecule::AtomIx;

/// What a tail says.
#[derive(Debug, Default)]
pub(super) struct Tail {
    pub(super) groups: Vec<StereoGroup>,
    /// That the whole is a racemate.
    pub(super) racemic: bool,
    pub(super) points: Option<Vec<Point>>,
}

/// Reads what stands between the bars; `column` is that of its first character.
pub(super) fn read(
    text: &str,
    column: usize,
    n_atoms: usize,
    notices: &mut Vec<Notice>,
) -> Result<Tail, SmilesError> {
    let mut tail = Tail::default();
    let mut ignored = Vec::new();
    let mut grouped = vec![false; n_atoms];
    for (start, field) in fields(text) {
        let column = column + text.get(..start).map_or(0, |before| before.chars().count());
        if field == "r" {
            tail.racemic = true;
        } else if let Some(places) = field.strip_prefix('(') {
            let places = places.strip_suffix(')').unwrap_or(places);
            tail.points = Some(points(places, column, n_atoms, notices)?);
        } else if let Some((kind, numbers)) = group(field) {
            let atoms = atoms(numbers, column, n_atoms)?;
            for atom in &atoms {
                if std::mem::replace(&mut grouped[atom.index()], true) {
                    let reason = Fault::TwoGroups(atom.index());
                    return Err(SmilesError::new(column, reason));
                }
            }
            let same = tail.groups.iter_mut().find(|g| g.kind == kind);
            match same {
                Some(known) => known.atoms.extend(atoms),
                None => tail.groups.push(StereoGroup { kind, atoms }),
            }
        } else if !field.is_empty() {
            ignored.push(field.to_owned());
        }
    }
    for group in &mut tail.groups {
        group.atoms.sort_unstable();
    }
    tail.groups.sort_by_key(|g| g.kind);
    if !ignored.is_empty() {
        let text = format!("parts of the tail are not read: {}", ignored.join(", "));
        notices.push(Notice::new(0, "tail", text));
    }
    Ok(tail)
}

/// The fields of a tail and where each begins, in bytes.
fn fields(text: &str) -> Vec<(usize, &str)> {
    let mut fields: Vec<(usize, usize)> = Vec::new();
    let mut depth = 0usize;
    let mut is_label = false;
    let mut start = 0;
    let mut take = |start: usize, end: usize| {
        let piece = text.get(start..end).unwrap_or_default();
        let goes_on = piece.starts_with(|c: char| c.is_ascii_digit());
        match fields.last_mut() {
            Some(last) if goes_on => last.1 = end,
            _ => fields.push((start, end)),
        }
    };
    for (i, c) in text.char_indices() {
        match c {
            '$' => is_label = !is_label,
            '(' | '{' if !is_label => depth += 1,
            ')' | '}' if !is_label => depth = depth.saturating_sub(1),
            ',' if !is_label && depth == 0 => {
                take(start, i);
                start = i + 1;
            }
            _ => {}
        }
    }
    take(start, text.len());
    let piece = |(from, to): (usize, usize)| (from, text.get(from..to).unwrap_or_default());
    fields.into_iter().map(piece).collect()
}

/// The kind and the numbers of a field that names a group: `a:`, `o1:`, `&2:`.
fn group(field: &str) -> Option<(GroupKind, &str)> {
    let (head, numbers) = field.split_once(':')?;
    let number = |digits: &str| digits.parse::<u32>().ok();
    let kind = match head.split_at_checked(1)? {
        ("a", "") => GroupKind::Absolute,
        ("o", digits) => GroupKind::Or(number(digits)?),
        ("&", digits) => GroupKind::And(number(digits)?),
        _ => return None,
    };
    Some((kind, numbers))
}

fn atoms(text: &str, column: usize, n_atoms: usize) -> Result<Vec<AtomIx>, SmilesError> {
    let mut list = Vec::new();
    for word in text.split(',').filter(|w| !w.is_empty()) {
        let number: Option<u32> = word.parse().ok();
        let Some(number) = number else {
            let reason = Fault::TailNumbers(word.to_owned());
            return Err(SmilesError::new(column, reason));
        };
        let index = usize::try_from(number).ok().filter(|n| *n < n_atoms);
        let Some(index) = index else {
            let reason = Fault::NoSuchAtom {
                number,
                atoms: n_atoms,
            };
            return Err(SmilesError::new(column, reason));
        };
        list.push(AtomIx::new(index));
    }
    Ok(list)
}

/// Places `x,y,z;x,y,z;...`, one for each atom; a number that is not written is 0.
fn points(
    text: &str,
    column: usize,
    n_atoms: usize,
    notices: &mut Vec<Notice>,
) -> Result<Vec<Point>, SmilesError> {
    let mut list = Vec::with_capacity(n_atoms);
    let mut is_deep = false;
    for place in text.split(';') {
        let mut parts = [0.0; 3];
        for (i, word) in place.split(',').enumerate() {
            let value = match word.trim() {
                "" => Some(0.0),
                word => word.parse::<f64>().ok().filter(|x| x.is_finite()),
            };
            match (parts.get_mut(i), value) {
                (Some(part), Some(value)) => *part = value,
                _ => {
                    let reason = Fault::Coordinate(word.to_owned());
                    return Err(SmilesError::new(column, reason));
                }
            }
        }
        is_deep |= parts[2] != 0.0;
        list.push(Point::new(parts[0], parts[1]));
    }
    if list.len() != n_atoms {
        let reason = Fault::Coordinates {
            places: list.len(),
            atoms: n_atoms,
        };
        return Err(SmilesError::new(column, reason));
    }
    if is_deep {
        notices.push(Notice::new(
            0,
            "in-space",
            "the atoms have depth (z), which was left out".to_owned(),
        ));
    }
    Ok(list)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn good(text: &str) -> (Tail, Vec<Notice>) {
        let mut notices = Vec::new();
        let tail = read(text, 1, 6, &mut notices).unwrap_or_else(|e| panic!("{text}: {e}"));
        (tail, notices)
    }

    #[test]
    fn groups_and_places() {
        let (tail, notices) = good("o1:1,2,a:0,&2:5,&1:3,o1:4");
        let found: Vec<(GroupKind, Vec<usize>)> = tail
            .groups
            .iter()
            .map(|g| (g.kind, g.atoms.iter().map(|a| a.index()).collect()))
            .collect();
        assert_eq!(
            found,
            [
                (GroupKind::Absolute, vec![0]),
                (GroupKind::And(1), vec![3]),
                (GroupKind::And(2), vec![5]),
                (GroupKind::Or(1), vec![1, 2, 4]),
            ]
        );
        assert!(notices.is_empty());
        let (tail, notices) = good("(0,1.5,;1,-2e0,;,,;3,3,1;4,4;5),r");
        assert!(tail.racemic);
        assert_eq!(tail.points.unwrap()[1], Point::new(1.0, -2.0));
        assert_eq!(notices[0].code, "in-space");
    }

    #[test]
    fn what_is_not_read_is_told() {
        let (tail, notices) = good("$R1,;;a:1$,w:1.2,3.4,a:1,SgD:1:x,{y,z}:,^1:0,c:0,2");
        assert_eq!(tail.groups.len(), 1);
        assert_eq!(
            notices[0].text,
            "parts of the tail are not read: $R1,;;a:1$, w:1.2,3.4, SgD:1:x, {y,z}:, ^1:0, c:0,2"
        );
        assert_eq!(good("").1.len(), 0);
    }

    #[test]
    fn faults_of_tails() {
        let bad = |text: &str| {
            let error = read(text, 10, 2, &mut Vec::new()).err();
            let error = error.unwrap_or_else(|| panic!("{text} was read"));
            (error.column, error.reason)
        };
        let missing = |number| Fault::NoSuchAtom { number, atoms: 2 };
        assert_eq!(bad("w:1,a:2"), (14, missing(2)));
        assert_eq!(bad("a:0,o1:0"), (14, Fault::TwoGroups(0)));
        assert_eq!(bad("a:x").1, Fault::TailNumbers("x".to_owned()));
        assert_eq!(
            bad("(0,0)").1,
            Fault::Coordinates {
                places: 1,
                atoms: 2
            }
        );
        assert_eq!(bad("(0,0;inf,0)").1, Fault::Coordinate("inf".to_owned()));
        assert_eq!(bad("(0,0;1,2,3,4)").1, Fault::Coordinate("4".to_owned()));
    }
}
