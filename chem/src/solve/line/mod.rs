//! A requirement line as typed: its grammar, notes and errors.
//!
//! A line holds what stands in front of a name, as `rac-(1R,2S)-`: a status, the sign of rotation,
//! items of a locant and a descriptor, and a name that is not used. It is brought into plain
//! characters, read by one grammar, then checked as a whole. Nothing here knows a molecule.
//!
//! Source of the forms: IUPAC 2013 recommendations P-91 to P-93 and IUPAC 1993 guide R-7. Which
//! departures from them are let through, with a note, is our own rule.

mod item;
mod locant;
mod name;
mod normalize;
mod numbered;
mod reader;
mod report;
mod settle;
#[cfg(test)]
mod tests;
mod value;
mod words;

pub use locant::{Locant, Numbered, OtherEnd, Place};
pub use report::{LineError, Note};
pub use value::Value;

use std::fmt;
use std::ops::Range;

/// What the line says of the sample as a whole.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Status {
    /// As written: no other status was typed.
    Abs,
    /// A racemate of what is written and its mirror image.
    Rac,
    /// One of what is written and its mirror image, not known which.
    Rel,
    /// Achiral in spite of its centers.
    Meso,
}

impl Status {
    /// Name in files and on the command line.
    pub fn name(self) -> &'static str {
        match self {
            Status::Abs => "abs",
            Status::Rac => "rac",
            Status::Rel => "rel",
            Status::Meso => "meso",
        }
    }
}

/// Sign of optical rotation. It says nothing of the configuration.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Rotation {
    /// (+).
    Plus,
    /// (-).
    Minus,
    /// (±), which makes the status a racemate.
    Both,
}

impl Rotation {
    /// The sign.
    pub fn sign(self) -> &'static str {
        match self {
            Rotation::Plus => "+",
            Rotation::Minus => "-",
            Rotation::Both => "±",
        }
    }
}

/// A descriptor asked for, and where.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Item {
    /// Where, if it was typed.
    pub locant: Option<Locant>,
    /// What.
    pub value: Value,
    /// Columns in the line as typed, from 1, the end excluded.
    pub columns: Range<usize>,
}

impl Item {
    /// `locant:value` in canonical spelling: `1:R`, `:S` without a locant, `*:E` for all, `1,2:cis`.
    pub fn spelled(&self) -> String {
        match self.locant {
            Some(locant) => format!("{locant}:{}", self.value),
            None => format!(":{}", self.value),
        }
    }
}

/// A line that was read.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Line {
    /// The line as typed.
    pub text: String,
    /// Its status.
    pub status: Status,
    /// The sign of rotation, if it was typed.
    pub rotation: Option<Rotation>,
    /// What is asked for, in the order typed; no item twice, no locant with two values.
    pub items: Vec<Item>,
    /// What was noticed, in the order of the codes, each once.
    pub notes: Vec<Note>,
}

/// Reads a line as typed.
///
/// # Errors
/// The first thing that cannot be read, with its column; then what contradicts itself in the line as a
/// whole, with column 0. More than 2,000 characters or 500 items are refused as `E-LIMIT`.
pub fn read(text: &str) -> Result<Line, LineError> {
    let plain = normalize::normalize(text)?;
    let found = reader::read(&plain)?;
    settle::settle(text, &plain, found)
}

/// An item inside the parentheses.
struct Shown<'a>(&'a Item);

impl fmt::Display for Shown<'_> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let value = match self.0.value {
            Value::Xi => "Ξ",
            other => other.spelled(),
        };
        let Some(locant) = self.0.locant else {
            return f.write_str(value);
        };
        match (locant.first, locant.second) {
            (_, Some(_)) => write!(f, "{locant}-{value}"),
            (Place::All, None) => write!(f, "all-{value}"),
            (Place::Element { symbol, .. }, None) if !words::is_heteroatom(symbol) => {
                write!(f, "{value}_{symbol}")
            }
            // without the superscript, 1r4R would also be 1r and 4R
            (Place::Numbered(numbered), None) if numbered.is_two_fold() => {
                numbered.write(f, true)?;
                f.write_str(value)
            }
            (_, None) => write!(f, "{locant}{value}"),
        }
    }
}

/// The canonical form: `rac-(1R,2S)`, items in the order of their locants. Read again, it gives the
/// same status and items. A name is left out; so is (±), which the status says.
///
/// Source: IUPAC 1993 guide; IUPAC 2013 recommendations P-14.3.5, P-93.1.2 and P-93.1.3.
impl fmt::Display for Line {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let mut hyphen = "";
        if let Some(rotation @ (Rotation::Plus | Rotation::Minus)) = self.rotation {
            write!(f, "({})", rotation.sign())?;
            hyphen = "-";
        }
        let said = match self.status {
            Status::Abs => !self.items.is_empty() || self.rotation.is_some(),
            Status::Rac => self.items.iter().any(|i| i.value.is_racemic()),
            Status::Rel => self.items.iter().any(|i| i.value.is_starred()),
            Status::Meso => false,
        };
        if !said {
            write!(f, "{hyphen}{}", self.status.name())?;
            hyphen = "-";
        }
        if self.items.is_empty() {
            return Ok(());
        }
        let mut items: Vec<&Item> = self.items.iter().collect();
        items.sort_by_key(|i| i.locant);
        write!(f, "{hyphen}(")?;
        for (index, item) in items.into_iter().enumerate() {
            f.write_str(if index == 0 { "" } else { "," })?;
            write!(f, "{}", Shown(item))?;
        }
        f.write_str(")")
    }
}
