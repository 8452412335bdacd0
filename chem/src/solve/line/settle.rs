//! What can be said only of the line as a whole: status, repeated and contradicting items.

use super::locant::Locant;
use super::normalize::Text;
use super::reader::{Found, Taken};
use super::report::{LineError, Note};
use super::value::Value;
use super::{Item, Line, Rotation, Status};
use crate::stereo::Descriptor;
use std::collections::BTreeMap;

/// Puts the parts of a line together.
///
/// # Errors
/// `E-CONFLICT`, `E-MIXED-LOC` and `E-STATUS`, all with column 0.
pub(super) fn settle(typed: &str, plain: &Text, found: Found) -> Result<Line, LineError> {
    let mut notes = found.notes;
    let items = distinct(found.items, &mut notes)?;
    located(&items, &mut notes)?;
    let status = status(&found.status, found.rotation, &items, &mut notes)?;
    remarks(&items, &mut notes);
    notes.sort();
    notes.dedup();
    Ok(Line {
        text: typed.to_owned(),
        status,
        rotation: found.rotation,
        items: items
            .into_iter()
            .map(|taken| Item {
                locant: taken.locant,
                value: taken.value,
                columns: plain.column(taken.start)..plain.column(taken.end.saturating_sub(1)) + 1,
            })
            .collect(),
        notes,
    })
}

/// Each item once. "All" is one locant for each kind of unit, and speaks of every locant of the kind.
fn distinct(items: Vec<Taken>, notes: &mut Vec<Note>) -> Result<Vec<Taken>, LineError> {
    let mut values: BTreeMap<(Locant, u8), Value> = BTreeMap::new();
    let mut kept = Vec::with_capacity(items.len());
    for taken in items {
        let Some(locant) = taken.locant else {
            kept.push(taken);
            continue;
        };
        let kind = if locant.is_all() {
            taken.value.kind()
        } else {
            0
        };
        match values.insert((locant, kind), taken.value) {
            None => kept.push(taken),
            Some(before) if before == taken.value => notes.push(Note::Duplicate),
            Some(before) => return Err(conflict(locant, before, taken.value)),
        }
    }
    let of_all = |kind| {
        kept.iter()
            .find(|t| t.locant.is_some_and(|l| l.is_all()) && t.value.kind() == kind)
    };
    for taken in &kept {
        if let (Some(locant), Some(all)) = (taken.locant, of_all(taken.value.kind()))
            && all.value != taken.value
        {
            return Err(conflict(locant, all.value, taken.value));
        }
    }
    Ok(kept)
}

fn conflict(locant: Locant, before: Value, value: Value) -> LineError {
    LineError::whole(
        "E-CONFLICT",
        format!("locant {locant} is given both {before} and {value}: keep one of them"),
    )
}

/// All items with locants or none.
fn located(items: &[Taken], notes: &mut Vec<Note>) -> Result<(), LineError> {
    let without = items.iter().filter(|t| t.locant.is_none()).count();
    let with = items
        .iter()
        .filter(|t| t.locant.is_some_and(|l| !l.is_all()))
        .count();
    if without > 0 && with > 0 {
        return Err(LineError::whole(
            "E-MIXED-LOC",
            "some descriptors have locants and some have none: give each its locant",
        ));
    }
    if without > 1 {
        notes.push(Note::Unlocated);
    }
    Ok(())
}

fn contradiction(text: &str) -> LineError {
    LineError::whole("E-STATUS", text)
}

/// The one status of the words typed, the sign of rotation and the starred or RS descriptors.
///
/// Source: IUPAC 1993 guide and IUPAC 2013 recommendations P-93.1.2 and P-93.1.3; that stars in a
/// racemate, `(±)-(1R*,2S*)`, only repeat what it says is common practice, no source.
fn status(
    words: &[Status],
    rotation: Option<Rotation>,
    items: &[Taken],
    notes: &mut Vec<Note>,
) -> Result<Status, LineError> {
    let said = words.first().copied();
    if words.iter().any(|w| Some(*w) != said) {
        return Err(contradiction(
            "the line says two different statuses: keep one of rac, rel, meso, abs",
        ));
    }
    if words.len() > 1 {
        notes.push(Note::Redundant);
    }
    let starred = items.iter().any(|t| t.value.is_starred());
    let racemic = items.iter().any(|t| t.value.is_racemic());
    let status = match (said, starred, racemic) {
        (_, true, true) => {
            return Err(contradiction(
                "R* and S* say relative, RS and SR say racemic: use one kind of them",
            ));
        }
        (None, true, false) => Status::Rel,
        (None, false, true) => Status::Rac,
        (None, false, false) => Status::Abs,
        (Some(word), false, false) => word,
        (Some(word @ (Status::Rac | Status::Rel)), true, false)
        | (Some(word @ Status::Rac), false, true) => {
            notes.push(Note::Redundant);
            word
        }
        (Some(_), _, _) => {
            return Err(contradiction(
                "the status and the descriptors contradict each other: leave out the status, or use plain R and S",
            ));
        }
    };
    let partial = (starred || racemic) && items.iter().any(|t| t.value.is_absolute());
    if partial {
        notes.push(Note::Partial);
    }
    let turns = matches!(rotation, Some(Rotation::Plus | Rotation::Minus));
    let inactive =
        status == Status::Meso || (status == Status::Rac && (said.is_some() || !partial));
    if turns && inactive {
        return Err(contradiction(
            "a racemate or a meso form has no rotation: leave out the sign, or the status",
        ));
    }
    Ok(status)
}

/// Notes on the values.
fn remarks(items: &[Taken], notes: &mut Vec<Note>) {
    if items.is_empty() {
        notes.push(Note::NoItems);
    }
    for taken in items {
        notes.extend(match taken.value {
            Value::Plain(Descriptor::LowerE | Descriptor::LowerZ) => Some(Note::LowerEz),
            Value::PlanarR | Value::PlanarS => Some(Note::PlaneOrPhosphorus),
            Value::Cis | Value::Trans => Some(Note::CisTrans),
            Value::Xi => Some(Note::Xi),
            Value::Plain(_)
            | Value::AxialR
            | Value::AxialS
            | Value::RelativeR
            | Value::RelativeS
            | Value::RacemicRs
            | Value::RacemicSr
            | Value::SeqCis
            | Value::SeqTrans => None,
        });
    }
}
