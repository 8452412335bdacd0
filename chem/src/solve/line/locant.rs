//! Where an item wants its descriptor.

use std::fmt;

/// The other end of a double bond, as the 10 of `1(10)E`.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct OtherEnd {
    /// Its number.
    pub number: u32,
    /// Its letter, as in `4(4a)`.
    pub letter: Option<char>,
    /// How many primes.
    pub primes: usize,
}

/// A numerical locant with its parts, in the order in which they count when locants are ranked: 3, 3',
/// 3a, 3a', 3a1.
///
/// Source: IUPAC 2013 recommendations P-14.3.5 for primes; the rest from memory of P-31.1.2.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Numbered {
    /// The number, from 1.
    pub number: u32,
    /// Superscript of a chain of a polycycle or assembly, as in `1^2`.
    pub superscript: Option<u32>,
    /// Letter of a fusion atom, as in `3a`.
    pub letter: Option<char>,
    /// Digit of an interior atom, as in `3a1`.
    pub digit: Option<u32>,
    /// How many primes.
    pub primes: usize,
    /// The other end of a double bond.
    pub other: Option<OtherEnd>,
}

/// A single place.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Place {
    /// Every unit of the kind (`all-E`).
    All,
    /// A heteroatom by its symbol, as `N` and `N2`.
    Element {
        /// The symbol.
        symbol: &'static str,
        /// The number behind it.
        number: Option<u32>,
        /// How many primes.
        primes: usize,
    },
    /// An atom of a side chain by its Greek letter.
    Greek {
        /// The letter.
        letter: char,
        /// How many primes.
        primes: usize,
    },
    /// An atom by its number.
    Numbered(Numbered),
}

/// A locant: one place, or the two of `1,2-cis`.
///
/// The order is that of a name: letters, Greek letters, then numbers (from memory).
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Locant {
    /// The place, or the lower one of two.
    pub first: Place,
    /// The higher one, of cis and trans only.
    pub second: Option<Place>,
}

impl Locant {
    /// A locant of one place.
    pub fn single(place: Place) -> Locant {
        Locant {
            first: place,
            second: None,
        }
    }

    /// A locant of two places, whichever is given first.
    pub fn pair(a: Place, b: Place) -> Locant {
        Locant {
            first: a.min(b),
            second: Some(a.max(b)),
        }
    }

    /// The number, if it is a plain one: no letter, prime, superscript or other end.
    pub fn number(&self) -> Option<usize> {
        match (self.first, self.second) {
            (Place::Numbered(n), None) if n == Numbered::plain(n.number) => {
                usize::try_from(n.number).ok()
            }
            _ => None,
        }
    }

    /// Whether it stands for every unit of a kind.
    pub fn is_all(&self) -> bool {
        self.first == Place::All
    }
}

fn primes(f: &mut fmt::Formatter<'_>, count: usize) -> fmt::Result {
    (0..count).try_for_each(|_| f.write_str("'"))
}

impl Numbered {
    /// A number with nothing more to it.
    pub fn plain(number: u32) -> Numbered {
        Numbered {
            number,
            superscript: None,
            letter: None,
            digit: None,
            primes: 0,
            other: None,
        }
    }

    /// Writes it; `raised` marks the digit of an interior atom as the superscript that it is.
    pub(super) fn write(&self, f: &mut fmt::Formatter<'_>, raised: bool) -> fmt::Result {
        write!(f, "{}", self.number)?;
        if let Some(superscript) = self.superscript {
            write!(f, "^{superscript}")?;
        }
        if let Some(letter) = self.letter {
            write!(f, "{letter}")?;
        }
        if let Some(digit) = self.digit {
            f.write_str(if raised { "^" } else { "" })?;
            write!(f, "{digit}")?;
        }
        primes(f, self.primes)?;
        if let Some(other) = self.other {
            write!(f, "({}", other.number)?;
            if let Some(letter) = other.letter {
                write!(f, "{letter}")?;
            }
            primes(f, other.primes)?;
            f.write_str(")")?;
        }
        Ok(())
    }
}

impl fmt::Display for Place {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Place::All => f.write_str("*"),
            Place::Element {
                symbol,
                number,
                primes: count,
            } => {
                f.write_str(symbol)?;
                if let Some(number) = number {
                    write!(f, "{number}")?;
                }
                primes(f, *count)
            }
            Place::Greek {
                letter,
                primes: count,
            } => {
                write!(f, "{letter}")?;
                primes(f, *count)
            }
            Place::Numbered(numbered) => numbered.write(f, false),
        }
    }
}

/// The canonical spelling; `*` for all, `1,2` for two places.
impl fmt::Display for Locant {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}", self.first)?;
        match self.second {
            Some(second) => write!(f, ",{second}"),
            None => Ok(()),
        }
    }
}
