//! Numerical locants and their readings.

use super::locant::{Locant, Numbered, OtherEnd, Place};
use super::reader::Reader;
use crate::stereo::Descriptor;

/// A numerical locant as it may be read, with its end.
#[derive(Clone, Copy, Debug)]
pub(super) struct Reading {
    pub(super) numbered: Numbered,
    pub(super) end: usize,
    /// Whether its letter may also be a descriptor and its digit the next locant.
    pub(super) two_fold: bool,
}

impl Numbered {
    /// Whether its plain spelling before a descriptor has two readings: 1r4R is also 1r and 4R.
    pub(super) fn is_two_fold(&self) -> bool {
        let letter = self.letter.and_then(Descriptor::from_letter);
        letter.is_some() && self.digit.is_some()
    }
}

impl Reader<'_> {
    pub(super) fn primes(&self, from: usize) -> usize {
        let mut count = 0;
        while self.at(from + count) == Some('\'') {
            count += 1;
        }
        count
    }

    /// A number from 1 without leading zero, and its end.
    pub(super) fn int(&self, from: usize) -> Option<(u32, usize)> {
        let mut value: u32 = 0;
        let mut index = from;
        while let Some(digit) = self.at(index).and_then(|c| c.to_digit(10)) {
            if value == 0 && index > from {
                return None;
            }
            value = value.checked_mul(10)?.checked_add(digit)?;
            index += 1;
        }
        (value > 0).then_some((value, index))
    }

    /// The readings of a numerical locant, the longer one, with a letter, first.
    pub(super) fn readings(&self, from: usize) -> Vec<Reading> {
        let Some((number, mut end)) = self.int(from) else {
            return Vec::new();
        };
        let mut superscript = None;
        if self.at(end) == Some('^') {
            let Some((value, stop)) = self.int(end + 1) else {
                return Vec::new();
            };
            (superscript, end) = (Some(value), stop);
        }
        let numbered = Numbered {
            superscript,
            ..Numbered::plain(number)
        };
        let with_letter = self.with_letter(numbered, end);
        let primes = self.primes(end);
        let without = Reading {
            numbered: Numbered { primes, ..numbered },
            end: end + primes,
            two_fold: false,
        };
        let both = with_letter.into_iter().chain(Some(without));
        both.filter_map(|r| self.with_other_end(r)).collect()
    }

    /// `3a`, `3a1`, `3a'`, and `3'a`, which is the same place.
    fn with_letter(&self, mut numbered: Numbered, from: usize) -> Option<Reading> {
        let before = self.primes(from);
        let mut end = from + before;
        let letter = self.at(end).filter(char::is_ascii_lowercase)?;
        numbered.letter = Some(letter);
        end += 1;
        let raised = self.at(end) == Some('^');
        let place = end + usize::from(raised);
        let digit = self.at(place).and_then(|c| c.to_digit(10));
        match digit {
            Some(0) => return None,
            Some(_) if self.at(place + 1).is_some_and(|c| c.is_ascii_digit()) => return None,
            Some(_) => {
                numbered.digit = digit;
                end = place + 1;
            }
            None if raised => return None,
            None => {}
        }
        let after = self.primes(end);
        if before > 0 && after > 0 {
            return None;
        }
        numbered.primes = before + after;
        Some(Reading {
            numbered,
            end: end + after,
            two_fold: numbered.is_two_fold() && !raised,
        })
    }

    /// `1(10)`: the other end of a double bond, if a bracket follows.
    fn with_other_end(&self, reading: Reading) -> Option<Reading> {
        if self.at(reading.end) != Some('(') {
            return Some(reading);
        }
        let (number, mut end) = self.int(reading.end + 1)?;
        let letter = self.at(end).filter(char::is_ascii_lowercase);
        end += usize::from(letter.is_some());
        let primes = self.primes(end);
        end += primes;
        let mut numbered = reading.numbered;
        numbered.other = Some(OtherEnd {
            number,
            letter,
            primes,
        });
        (self.at(end) == Some(')')).then_some(Reading {
            numbered,
            end: end + 1,
            two_fold: reading.two_fold,
        })
    }

    /// Whether a numerical locant without a descriptor stands at `from`.
    pub(super) fn is_number_alone(&self, from: usize) -> bool {
        self.readings(from).iter().any(|r| {
            let next = self.past_blanks(r.end);
            matches!(self.at(next), None | Some(',' | ';'))
        })
    }

    /// Two numerical locants with a comma between them, and their end.
    pub(super) fn two_places(&self, from: usize) -> Option<(Locant, usize)> {
        let first = self.readings(from).into_iter().next()?;
        if self.at(first.end) != Some(',') {
            return None;
        }
        let second = self
            .readings(self.past_blanks(first.end + 1))
            .into_iter()
            .next()?;
        let places = (
            Place::Numbered(first.numbered),
            Place::Numbered(second.numbered),
        );
        (places.0 != places.1).then_some((Locant::pair(places.0, places.1), second.end))
    }
}
