//! One item: a locant and its descriptor.

use super::locant::{Locant, Place};
use super::numbered::Reading;
use super::reader::{MOST_ITEMS, Reader, Taken, closing};
use super::report::{LineError, Note};
use super::value::Value;
use super::words::{self, Spelled};
use crate::stereo::Descriptor;

fn is_greek(c: char) -> bool {
    ('α'..='ω').contains(&c)
}

impl Reader<'_> {
    /// Reads an item.
    pub(super) fn item(&mut self) -> Result<(), LineError> {
        let start = self.pos;
        let digit = |index| self.at(index).is_some_and(|c: char| c.is_ascii_digit());
        match self.at(start) {
            Some('-') if digit(start + 1) => Err(self.bad_locant(start)),
            Some(c) if c.is_ascii_digit() => self.numbered(start, start),
            Some('C') if digit(start + 1) => self.numbered(start, start + 1),
            Some(c) if is_greek(c) => self.greek(start, c),
            Some(c) if c.is_alphabetic() || c == '?' => self.lettered(start),
            Some(c) => Err(self.unexpected(start, c)),
            None => Err(self.error("E-EMPTY", start, "an item is missing here: type one, as 1R")),
        }
    }

    fn bad_locant(&self, start: usize) -> LineError {
        self.error(
            "E-LOCANT",
            start,
            "this is not a locant: write 3, 3a, 3a1, 12', 1^2 or 1(10), then the descriptor at once",
        )
    }

    fn no_descriptor(&self, start: usize) -> LineError {
        self.error(
            "E-NO-DESC",
            start,
            "a locant without a descriptor: type it right behind the locant, as 1R",
        )
    }

    fn declined(&self, start: usize, word: &str) -> LineError {
        self.error(
            "E-UNSUPPORTED",
            start,
            format!("'{word}' is known but not handled: give R, S, E or Z instead"),
        )
    }

    fn unknown(&self, start: usize, word: &str) -> LineError {
        let advice = if words::status(word).is_some() {
            format!("'{word}' belongs in front of the parentheses, as {word}-(1R,2S)")
        } else if let Some(near) = words::nearest(word) {
            format!("'{word}' is not a descriptor: is {near} meant?")
        } else {
            format!(
                "'{word}' is not a descriptor: use R, S, E, Z, r, s, M, P or another one of the list"
            )
        };
        self.error("E-UNKNOWN", start, advice)
    }

    /// The error of a word that is no descriptor, `located` if a locant stands before it.
    fn not_descriptor(&self, start: usize, word: &str, located: bool) -> LineError {
        if words::is_dl(word) {
            let text = "D and L are not read, as they need a reference compound: give R and S";
            return self.error("E-DL", start, text);
        }
        let bare = self.is_at_start(start);
        if words::is_declined(word, located || !bare) {
            return self.declined(start, word);
        }
        if !located && words::is_run_together(word) {
            let text =
                format!("'{word}' can be read in several ways: put a comma between descriptors");
            return self.error("E-AMBIG", start, text);
        }
        self.unknown(start, word)
    }

    /// Whether nothing but blanks stands before `index`.
    fn is_at_start(&self, index: usize) -> bool {
        self.past_blanks(0) == index
    }

    /// The descriptor that the whole word at `from` is, and its end.
    fn descriptor(&self, from: usize) -> Option<(Spelled, usize)> {
        let (word, stop) = self.word(from);
        words::descriptor(&word).map(|spelled| (spelled, stop))
    }

    /// The sign between locant and descriptor, and what follows it.
    fn joiner(&self, from: usize) -> (Option<char>, usize) {
        match self.at(from) {
            Some(c @ ('-' | ':' | '=')) => (Some(c), from + 1),
            _ => (None, from),
        }
    }

    /// An item that starts with a number at `from`.
    fn numbered(&mut self, start: usize, from: usize) -> Result<(), LineError> {
        if let Some((locant, end)) = self.two_places(from)
            && let (Some('-'), Some((spelled, stop))) = (self.at(end), self.descriptor(end + 1))
            && spelled.value.is_cis_trans()
        {
            return self.take(start, stop, Some(locant), spelled, None);
        }
        let readings = self.readings(from);
        for reading in &readings {
            let (joiner, next) = self.joiner(reading.end);
            let Some((spelled, stop)) = self.descriptor(next) else {
                continue;
            };
            if reading.two_fold {
                let text = "the letter may belong to the locant or be a descriptor: separate items by commas, \
                            or write the digit of an interior atom as 3r^1";
                return Err(self.error("E-AMBIG", start, text));
            }
            let locant = Locant::single(Place::Numbered(reading.numbered));
            return self.take(start, stop, Some(locant), spelled, joiner);
        }
        Err(self.bad_numbered(start, &readings))
    }

    /// Why no descriptor follows a number.
    fn bad_numbered(&self, start: usize, readings: &[Reading]) -> LineError {
        let (Some(longest), Some(shortest)) = (readings.first(), readings.last()) else {
            return self.bad_locant(start);
        };
        let (_, next) = self.joiner(shortest.end);
        let (word, stop) = self.word(next);
        if words::is_dl(&word) || words::is_declined(&word, true) {
            return self.not_descriptor(start, &word, true);
        }
        // 3a12 is longer than any locant
        let digits = readings.len() == 1
            && word.chars().count() == 1
            && word.chars().all(|c| c.is_ascii_lowercase())
            && self
                .at(stop)
                .is_some_and(|c| c.is_ascii_digit() || c == '^');
        let (joiner, behind) = self.joiner(longest.end);
        match self.at(behind) {
            _ if digits => self.bad_locant(start),
            None | Some(',' | ';' | ' ' | '/') => self.no_descriptor(start),
            Some('.' | '^' | '(' | '\'') => self.bad_locant(start),
            Some(c) if c.is_ascii_digit() || (joiner.is_some() && c == '-') => {
                self.bad_locant(start)
            }
            Some(c) if closing(c).is_some() => self.no_descriptor(start),
            Some(_) if !word.is_empty() => self.unknown(start, &word),
            Some(c) => self.unexpected(behind, c),
        }
    }

    /// An item that starts with a Greek letter.
    fn greek(&mut self, start: usize, letter: char) -> Result<(), LineError> {
        let primes = self.primes(start + 1);
        let (joiner, next) = self.joiner(start + 1 + primes);
        if matches!(self.at(next), Some('R' | 'S' | 'E' | 'Z' | 'Ξ' | '?'))
            && let Some((spelled, stop)) = self.descriptor(next)
        {
            let locant = Locant::single(Place::Greek { letter, primes });
            return self.take(start, stop, Some(locant), spelled, joiner);
        }
        let (word, _) = self.word(next);
        Err(match self.at(next) {
            Some(c) if c.is_ascii_digit() && joiner.is_none() => self.bad_locant(start),
            _ if joiner.is_none() && !word.is_empty() => self.unknown(start, &word),
            _ if matches!(letter, 'α' | 'β') => self.declined(start, &letter.to_string()),
            _ => self.no_descriptor(start),
        })
    }

    /// An item that starts with a Latin letter: all, an element, or a descriptor without locant.
    fn lettered(&mut self, start: usize) -> Result<(), LineError> {
        let (word, stop) = self.word(start);
        if let Some(outcome) = self.all(start, &word, stop) {
            return outcome;
        }
        if let Some((place, joiner, spelled, end)) = self.element(start) {
            return self.take(start, end, Some(Locant::single(place)), spelled, joiner);
        }
        let Some(spelled) = words::descriptor(&word) else {
            return Err(self.bad_lettered(start, &word, stop));
        };
        if self.at(stop) != Some('-') {
            return self.take(start, stop, None, spelled, None);
        }
        let conformation = spelled.value == Value::Plain(Descriptor::LowerS);
        let next = self.descriptor(stop + 1);
        if conformation && next.is_some_and(|(s, _)| s.value.is_cis_trans()) {
            return Err(self.declined(start, "s-cis or s-trans"));
        }
        if let (true, Some((locant, end))) =
            (spelled.value.is_cis_trans(), self.two_places(stop + 1))
            && matches!(self.at(end), None | Some('-' | ' ' | ';'))
        {
            return self.take(start, end, Some(locant), spelled, None);
        }
        self.take(start, stop, None, spelled, None)
    }

    /// `all-E`, `allE`.
    fn all(&mut self, start: usize, word: &str, stop: usize) -> Option<Result<(), LineError>> {
        let (head, rest) = word.split_at_checked(3)?;
        if !head.eq_ignore_ascii_case("all") {
            return None;
        }
        let locant = Some(Locant::single(Place::All));
        if !rest.is_empty() {
            let spelled = words::descriptor(rest)?;
            return Some(self.take(start, stop, locant, spelled, None));
        }
        if self.at(stop) == Some('-') {
            if let Some((spelled, end)) = self.descriptor(stop + 1) {
                return Some(self.take(start, end, locant, spelled, None));
            }
            let (next, _) = self.word(stop + 1);
            if !next.is_empty() {
                return Some(Err(self.not_descriptor(start, &next, true)));
            }
        }
        let text = "no descriptor follows 'all': write it as (all-E)";
        Some(Err(self.error("E-NO-DESC", start, text)))
    }

    /// An element as locant; only before R, S, r, s, E, Z and Ξ, so that a lone P stays a descriptor.
    fn element(&self, start: usize) -> Option<(Place, Option<char>, Spelled, usize)> {
        words::HETEROATOMS.into_iter().find_map(|symbol| {
            let mut end = start;
            for c in symbol.chars() {
                if self.at(end) != Some(c) {
                    return None;
                }
                end += 1;
            }
            let raised = usize::from(self.at(end) == Some('^'));
            let number = self.int(end + raised);
            end = number.map_or(end, |(_, stop)| stop);
            let primes = self.primes(end);
            let (joiner, next) = self.joiner(end + primes);
            if !matches!(
                self.at(next),
                Some('R' | 'S' | 'r' | 's' | 'E' | 'Z' | 'Ξ' | '?')
            ) {
                return None;
            }
            let (spelled, stop) = self.descriptor(next)?;
            let number = number.map(|(value, _)| value);
            Some((
                Place::Element {
                    symbol,
                    number,
                    primes,
                },
                joiner,
                spelled,
                stop,
            ))
        })
    }

    /// Why a word is no item.
    fn bad_lettered(&self, start: usize, word: &str, stop: usize) -> LineError {
        let number = self.at(stop + 1).is_some_and(|c| c.is_ascii_digit());
        if words::is_polyhedron(word) && self.at(stop) == Some('-') && number {
            return self.declined(start, word);
        }
        if words::is_heteroatom(word) && !words::is_declined(word, false) {
            let (_, digits) = self.int(stop).unwrap_or((0, stop));
            let (joiner, next) = self.joiner(digits + self.primes(digits));
            let (behind, _) = self.word(next);
            let name =
                joiner == Some('-') && words::is_name_like(&behind.chars().collect::<Vec<_>>());
            if behind.is_empty() || name {
                return self.no_descriptor(start);
            }
            return self.not_descriptor(start, &behind, true);
        }
        self.not_descriptor(start, word, false)
    }

    /// `/` or "or" behind a descriptor, and where the alternative starts.
    fn alternative(&self, from: usize) -> Option<(usize, usize)> {
        let at = self.past_blanks(from);
        if self.at(at) == Some('/') {
            return Some((at, self.past_blanks(at + 1)));
        }
        let (word, stop) = self.word(at);
        (at > from && self.is_conjunction(at) && word.eq_ignore_ascii_case("or"))
            .then(|| (at, self.past_blanks(stop)))
    }

    /// Takes the item from `start` to `end`, with the alternative behind it if there is one.
    fn take(
        &mut self,
        start: usize,
        mut end: usize,
        locant: Option<Locant>,
        mut spelled: Spelled,
        joiner: Option<char>,
    ) -> Result<(), LineError> {
        if let Some((at, next)) = self.alternative(end) {
            let Some((other, stop)) = self.descriptor(next) else {
                return Err(self.alternatives(at));
            };
            let double_bond = |v| matches!(v, Value::Plain(Descriptor::E | Descriptor::Z));
            if !spelled.value.is_opposite(other.value) {
                return Err(self.alternatives(at));
            }
            if !double_bond(spelled.value) {
                let text = format!(
                    "{}/{} may mean a racemate, an unknown centre or either isomer: write rac-, Ξ, or one of them",
                    spelled.value, other.value
                );
                return Err(self.error("E-RS-SLASH", start, text));
            }
            spelled = Spelled {
                value: Value::Xi,
                element: None,
                mixed: true,
            };
            end = stop;
        }
        if self.found.items.len() >= MOST_ITEMS {
            let text = format!("more than {MOST_ITEMS} items: shorten the line");
            return Err(self.error("E-LIMIT", start, text));
        }
        let notes = &mut self.found.notes;
        notes.extend(spelled.mixed.then_some(Note::MixedEz));
        notes.extend(spelled.element.map(|_| Note::AtomSuffix));
        let separated = match joiner {
            Some('-') => !spelled.value.is_cis_trans(),
            other => other.is_some(),
        };
        notes.extend(separated.then_some(Note::Separator));
        let suffix = spelled.element.map(|symbol| {
            Locant::single(Place::Element {
                symbol,
                number: None,
                primes: 0,
            })
        });
        self.found.items.push(Taken {
            locant: locant.or(suffix),
            value: spelled.value,
            start,
            end,
            hyphen: joiner == Some('-'),
        });
        self.pos = end;
        Ok(())
    }
}
