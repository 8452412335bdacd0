//! The line: statuses, signs of rotation and groups of items, then a name.

use super::locant::Locant;
use super::normalize::Text;
use super::report::{LineError, Note};
use super::value::Value;
use super::words;
use super::{Rotation, Status};
use crate::stereo::Descriptor;

/// The most items in a line.
pub(super) const MOST_ITEMS: usize = 500;

/// An item with its place in the plain characters.
#[derive(Clone, Debug)]
pub(super) struct Taken {
    pub(super) locant: Option<Locant>,
    pub(super) value: Value,
    pub(super) start: usize,
    pub(super) end: usize,
    /// Whether a hyphen joins locant and descriptor.
    pub(super) hyphen: bool,
}

impl Taken {
    /// Written as names write their own letters: p-, 2-s-.
    pub(super) fn is_loose(&self) -> bool {
        let lower = matches!(
            self.value,
            Value::Plain(
                Descriptor::LowerR
                    | Descriptor::LowerS
                    | Descriptor::LowerE
                    | Descriptor::LowerZ
                    | Descriptor::LowerM
                    | Descriptor::LowerP
            )
        );
        lower && (self.locant.is_none() || self.hyphen)
    }

    /// Written as no name is: 2S.
    pub(super) fn is_firm(&self) -> bool {
        self.locant.is_some() && !self.hyphen
    }
}

/// The parts of a line.
#[derive(Clone, Debug, Default)]
pub(super) struct Found {
    pub(super) status: Vec<Status>,
    pub(super) rotation: Option<Rotation>,
    pub(super) items: Vec<Taken>,
    pub(super) notes: Vec<Note>,
}

/// A place in the line and what was read up to there.
pub(super) struct Reader<'a> {
    pub(super) text: &'a Text,
    /// For each opening bracket its closing one.
    pub(super) partner: &'a [Option<usize>],
    pub(super) pos: usize,
    /// Nothing is read from here on.
    pub(super) end: usize,
    pub(super) found: Found,
    /// Where the items of the last part start, if it had no brackets.
    pub(super) bare: Option<usize>,
}

/// Reads the parts of a line.
///
/// # Errors
/// All errors that have a column.
pub(super) fn read(text: &Text) -> Result<Found, LineError> {
    let partner = partners(text)?;
    let mut reader = Reader::new(text, &partner, 0, text.chars.len());
    reader.line()?;
    Ok(reader.found)
}

pub(super) fn closing(open: char) -> Option<char> {
    match open {
        '(' => Some(')'),
        '[' => Some(']'),
        '{' => Some('}'),
        _ => None,
    }
}

fn partners(text: &Text) -> Result<Vec<Option<usize>>, LineError> {
    let mut partner = vec![None; text.chars.len()];
    let mut open: Vec<(usize, char)> = Vec::new();
    for (index, &c) in text.chars.iter().enumerate() {
        if let Some(close) = closing(c) {
            open.push((index, close));
        } else if matches!(c, ')' | ']' | '}') {
            match open.pop() {
                Some((at, close)) if close == c => {
                    if let Some(slot) = partner.get_mut(at) {
                        *slot = Some(index);
                    }
                }
                _ => {
                    return Err(LineError::new(
                        "E-UNBALANCED",
                        text.column(index),
                        format!(
                            "no bracket opened before it fits this '{c}': delete it, or open one"
                        ),
                    ));
                }
            }
        }
    }
    match open.first() {
        Some((at, close)) => Err(LineError::new(
            "E-UNBALANCED",
            text.column(*at),
            format!("this bracket is not closed: add '{close}'"),
        )),
        None => Ok(partner),
    }
}

/// Whether a list stands in brackets.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(super) enum Around {
    Brackets,
    Nothing,
}

impl<'a> Reader<'a> {
    pub(super) fn new(
        text: &'a Text,
        partner: &'a [Option<usize>],
        pos: usize,
        end: usize,
    ) -> Reader<'a> {
        Reader {
            text,
            partner,
            pos,
            end,
            found: Found::default(),
            bare: None,
        }
    }

    /// The character at `index`, if it is to be read.
    pub(super) fn at(&self, index: usize) -> Option<char> {
        if index < self.end {
            self.text.chars.get(index).copied()
        } else {
            None
        }
    }

    pub(super) fn error(
        &self,
        code: &'static str,
        index: usize,
        text: impl Into<String>,
    ) -> LineError {
        LineError::new(code, self.text.column(index), text)
    }

    pub(super) fn past_blanks(&self, from: usize) -> usize {
        let mut index = from;
        while self.at(index) == Some(' ') {
            index += 1;
        }
        index
    }

    fn skip_blanks(&mut self) {
        self.pos = self.past_blanks(self.pos);
    }

    /// The word at `from` and its end; stars, question marks and the `_` of a suffix belong to it.
    pub(super) fn word(&self, from: usize) -> (String, usize) {
        let mut word = String::new();
        let mut index = from;
        while let Some(c) = self.at(index) {
            if !c.is_alphabetic() && !matches!(c, '*' | '?' | '_') {
                break;
            }
            word.push(c);
            index += 1;
        }
        (word, index)
    }

    pub(super) fn slice(&self, from: usize, to: usize) -> &[char] {
        self.text.chars.get(from..to).unwrap_or(&[])
    }

    fn line(&mut self) -> Result<(), LineError> {
        self.skip_blanks();
        if self.at(self.pos).is_none() {
            return Err(LineError::whole(
                "E-EMPTY",
                "the line is empty: type descriptors, as (1R,2S)",
            ));
        }
        let mut first = true;
        loop {
            self.skip_blanks();
            let hyphen = !first && self.at(self.pos) == Some('-');
            if hyphen {
                self.pos += 1;
                self.skip_blanks();
            }
            let Some(c) = self.at(self.pos) else {
                return Ok(());
            };
            if !first {
                self.refuse_connector(c)?;
            }
            if self.rotation()? || self.status_word() {
                self.bare = None;
            } else if hyphen {
                self.behind_hyphen()?;
            } else {
                let outcome = self.group(c);
                outcome.map_err(|e| {
                    if first {
                        self.plain_name(e)
                    } else {
                        want_hyphen(e)
                    }
                })?;
            }
            first = false;
        }
    }

    /// What says "one or the other", or joins groups, between two parts of the line.
    fn refuse_connector(&self, c: char) -> Result<(), LineError> {
        let (word, stop) = self.word(self.pos);
        let joins = ["and", "or"].iter().any(|w| word.eq_ignore_ascii_case(w))
            && self
                .at(stop)
                .is_some_and(|c| c == ' ' || c == '-' || closing(c).is_some());
        if joins || matches!(c, '/' | '+' | '&' | '|') {
            return Err(self.alternatives(self.pos));
        }
        if matches!(c, ',' | ';') {
            return Err(self.error(
                "E-UNKNOWN",
                self.pos,
                "no comma stands between groups: put all items into one pair of parentheses",
            ));
        }
        Ok(())
    }

    pub(super) fn alternatives(&self, index: usize) -> LineError {
        self.error(
            "E-SLASH",
            index,
            "a line asks for one stereoisomer: give the alternatives one by one, or write rac- or rel-",
        )
    }

    /// `(+)`, `(-)` or `(±)`.
    fn rotation(&mut self) -> Result<bool, LineError> {
        if self.at(self.pos) != Some('(') {
            return Ok(false);
        }
        let sign = self.past_blanks(self.pos + 1);
        let rotation = match self.at(sign) {
            Some('+') => Rotation::Plus,
            Some('-') => Rotation::Minus,
            Some('±') => Rotation::Both,
            _ => return Ok(false),
        };
        let close = self.past_blanks(sign + 1);
        if self.at(close) != Some(')') {
            return Ok(false);
        }
        if self.found.rotation.is_some() {
            return Err(self.error(
                "E-ROT-TWICE",
                self.pos,
                "a second sign of rotation: keep one",
            ));
        }
        if rotation == Rotation::Both {
            self.found.status.push(Status::Rac);
        }
        self.found.rotation = Some(rotation);
        self.pos = close + 1;
        Ok(true)
    }

    /// A status word at `from` and its end, with its dot.
    fn status_at(&self, from: usize) -> Option<(Status, usize)> {
        let (word, stop) = self.word(from);
        let status = words::status(&word)?;
        Some((status, stop + usize::from(self.at(stop) == Some('.'))))
    }

    /// A status word, bare or in parentheses.
    fn status_word(&mut self) -> bool {
        let found = if self.at(self.pos) == Some('(') {
            let start = self.past_blanks(self.pos + 1);
            self.status_at(start).and_then(|(status, stop)| {
                let close = self.past_blanks(stop);
                (self.at(close) == Some(')')).then_some((status, close + 1))
            })
        } else {
            self.status_at(self.pos)
        };
        match found {
            Some((status, stop)) => {
                self.found.status.push(status);
                self.pos = stop;
                true
            }
            None => false,
        }
    }

    fn group(&mut self, c: char) -> Result<(), LineError> {
        if closing(c).is_some() {
            self.bracketed()
        } else {
            self.unbracketed()
        }
    }

    /// A list in brackets.
    pub(super) fn bracketed(&mut self) -> Result<(), LineError> {
        self.bare = None;
        let open = self.pos;
        let (mut inner, mut close) = (open, self.end);
        let outer = self.partner_of(open);
        let mut depth = 0;
        // brackets around brackets
        while let Some(partner) = self.partner_of(inner) {
            if depth > 0 && self.past_blanks(partner + 1) < close {
                break;
            }
            if self.at(inner) != Some('(') || depth > 0 {
                self.found.notes.push(Note::Bracket);
            }
            close = partner;
            inner = self.past_blanks(inner + 1);
            depth += 1;
        }
        let end = std::mem::replace(&mut self.end, close);
        self.pos = inner;
        let outcome = self.list(Around::Brackets);
        let (word, stop) = self.word(inner);
        let lone = !word.is_empty() && self.past_blanks(stop) == close;
        self.end = end;
        let behind = outer.map_or(self.end, |o| o + 1);
        self.pos = behind;
        outcome.map_err(|mut error| {
            // a word in brackets before a group is a prefix, as (rac)- is, and is named as a whole
            if error.code == "E-UNSUPPORTED" && lone && self.is_before_group(behind) {
                error.column = self.text.column(open);
            }
            error
        })
    }

    pub(super) fn partner_of(&self, open: usize) -> Option<usize> {
        self.at(open)?;
        self.partner.get(open).copied().flatten()
    }

    fn is_before_group(&self, from: usize) -> bool {
        let mut next = self.past_blanks(from);
        if self.at(next) == Some('-') {
            next = self.past_blanks(next + 1);
        }
        self.at(next).and_then(closing).is_some()
    }

    /// A list without brackets, up to a hyphen, a bracket or the end.
    pub(super) fn unbracketed(&mut self) -> Result<(), LineError> {
        let before = self.found.items.len();
        if self.bare.is_some() {
            self.found.notes.push(Note::Separator);
        }
        self.bare = Some(before);
        self.list(Around::Nothing)?;
        // cis- and trans- are never bracketed in names
        let new = self.found.items.iter().skip(before);
        if new.into_iter().any(|t| !t.value.is_cis_trans()) {
            self.found.notes.push(Note::Bare);
        }
        Ok(())
    }

    /// Items and what stands between them.
    pub(super) fn list(&mut self, around: Around) -> Result<(), LineError> {
        loop {
            self.skip_blanks();
            if matches!(self.at(self.pos), None | Some(',' | ';')) {
                return Err(self.error(
                    "E-EMPTY",
                    self.pos,
                    "an item is missing here: type a locant with its descriptor, as 1R, or delete the sign",
                ));
            }
            self.item()?;
            if !self.separator(around)? {
                return Ok(());
            }
        }
    }

    /// Goes past what separates two items; false at the end of the list.
    fn separator(&mut self, around: Around) -> Result<bool, LineError> {
        let behind = self.pos;
        self.skip_blanks();
        let blank = self.pos > behind;
        let Some(c) = self.at(self.pos) else {
            return Ok(false);
        };
        let bare = around == Around::Nothing;
        match c {
            ',' => self.pos += 1,
            ';' => {
                self.found.notes.push(Note::Separator);
                self.pos += 1;
            }
            '/' | '+' | '&' | '|' => return Err(self.alternatives(self.pos)),
            '-' if bare => return Ok(false),
            '-' | ':' | '=' => {
                let next = self.past_blanks(self.pos + 1);
                return Err(match self.at(next) {
                    None | Some(',' | ';') => self.error(
                        "E-EMPTY",
                        next,
                        format!("nothing stands behind '{c}': delete it, or type the rest"),
                    ),
                    Some(_) => self.unexpected(self.pos, c),
                });
            }
            _ if bare && closing(c).is_some() => return Ok(false),
            _ if blank && self.is_conjunction(self.pos) => return Err(self.alternatives(self.pos)),
            _ if bare && blank && self.status_at(self.pos).is_some() => return Ok(false),
            _ if c.is_ascii_digit() || (blank && (c.is_alphabetic() || c == '?')) => {
                self.letter_before_number(c, blank)?;
                self.found.notes.push(Note::NoComma);
            }
            _ => return Err(self.unexpected(self.pos, c)),
        }
        Ok(true)
    }

    pub(super) fn is_conjunction(&self, from: usize) -> bool {
        let (word, stop) = self.word(from);
        self.at(stop) == Some(' ') && ["and", "or"].iter().any(|w| word.eq_ignore_ascii_case(w))
    }

    pub(super) fn unexpected(&self, index: usize, c: char) -> LineError {
        self.error(
            "E-UNKNOWN",
            index,
            format!("'{c}' has no meaning here: separate items by commas, as (1R,2S)"),
        )
    }

    /// Refuses `R1` and `R 1`, where the number belongs to the letter before it.
    fn letter_before_number(&self, c: char, blank: bool) -> Result<(), LineError> {
        match self.found.items.last() {
            Some(last) if last.locant.is_none() && c.is_ascii_digit() => {
                if !blank || self.is_number_alone(self.pos) {
                    return Err(self.order(last));
                }
                Ok(())
            }
            _ => Ok(()),
        }
    }

    pub(super) fn order(&self, last: &Taken) -> LineError {
        self.error(
            "E-ORDER",
            last.start,
            format!(
                "the number stands before its descriptor: write 1{0}, not {0}1",
                last.value
            ),
        )
    }
}

fn want_hyphen(mut error: LineError) -> LineError {
    if error.code == "E-UNKNOWN" {
        error
            .text
            .push_str("; a name needs a hyphen in front of it");
    }
    error
}
