//! Why a record could not be read or written, and what was noticed on the way.

use super::smiles;
use crate::molecule::AtomIx;
use std::fmt;

/// Something in a file that was repaired or that the reader should know of.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Notice {
    /// Line of the file, from 1; 0 if it has no line.
    pub line: usize,
    /// Stable name in kebab-case.
    pub code: &'static str,
    /// What it is, in a sentence.
    pub text: String,
    /// The atoms that it is about, where a finding is made of it.
    pub atoms: Vec<AtomIx>,
}

impl Notice {
    /// A notice at a line of the file.
    pub fn new(line: usize, code: &'static str, text: String) -> Notice {
        Notice {
            line,
            code,
            text,
            atoms: Vec::new(),
        }
    }

    /// The same, about these atoms.
    #[must_use]
    pub fn about(mut self, atoms: &[AtomIx]) -> Notice {
        self.atoms = atoms.to_vec();
        self
    }
}

impl fmt::Display for Notice {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self.line {
            0 => f.write_str(&self.text),
            line => write!(f, "line {line}: {}", self.text),
        }
    }
}

/// Why a record cannot be read, and where.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct ReadError {
    /// Line of the file, from 1.
    pub line: usize,
    /// First and last column of that line, from 1, where the fault can be placed so closely.
    pub columns: Option<(usize, usize)>,
    /// What is wrong.
    pub reason: Reason,
}

impl ReadError {
    /// An error that a whole line has.
    pub fn line(line: usize, reason: Reason) -> ReadError {
        ReadError {
            line,
            columns: None,
            reason,
        }
    }

    /// An error in bytes `start..end` of a line.
    pub(super) fn at(line: usize, start: usize, end: usize, reason: Reason) -> ReadError {
        ReadError {
            line,
            columns: Some((start + 1, end.max(start + 1))),
            reason,
        }
    }
}

impl fmt::Display for ReadError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self.columns {
            Some((a, b)) if a == b => write!(f, "line {}, column {a}: ", self.line)?,
            Some((a, b)) => write!(f, "line {}, columns {a}-{b}: ", self.line)?,
            None => write!(f, "line {}: ", self.line)?,
        }
        write!(f, "{}. {}", self.reason, self.reason.remedy())
    }
}

impl std::error::Error for ReadError {}

/// What is wrong with a record.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Reason {
    /// Nothing but blanks.
    Empty,
    /// Text in UTF-16.
    Utf16,
    /// No text.
    Binary,
    /// Text, but neither molfile nor SD file.
    NotMolfile,
    /// The record is longer than any that is read (the limit in bytes).
    TooLong(usize),
    /// No line with the numbers of atoms and bonds among the first six.
    NoCountsLine,
    /// A counts line that says V3000, and no table of that version after it.
    NotV3000,
    /// A line in a V3000 table that does not start as all its lines must.
    NoPrefix,
    /// A line that has no place where it stands; what should stand there.
    Misplaced {
        /// The line's first words.
        found: String,
        /// What should stand there.
        expected: &'static str,
    },
    /// The V3000 line COUNTS is missing or does not fit the lines that follow: atoms and bonds said, atoms
    /// and bonds found.
    CountsEntry {
        /// As the line says; nothing if it is missing.
        said: Option<(usize, usize)>,
        /// Lines of atoms and bonds.
        found: (usize, usize),
    },
    /// An index that two atoms of a V3000 table have, and the line of the first.
    IndexTwice {
        /// The index.
        index: u32,
        /// Line of the first atom with it.
        first: usize,
    },
    /// An index that no atom of a V3000 table has.
    NoSuchIndex(i64),
    /// More than 999 atoms or bonds in a V2000 counts line.
    NeedsV3000,
    /// The counts line does not fit the lines that follow: atoms and bonds said, atoms and bonds found.
    Counts {
        /// As the counts line says.
        said: (usize, usize),
        /// Lines that look like atoms and bonds.
        found: (usize, usize),
    },
    /// The text ends too early; what should have come.
    EndsEarly(&'static str),
    /// A field that should hold a number.
    Number {
        /// What the field is.
        field: &'static str,
        /// What it holds.
        text: String,
    },
    /// A number outside of what the field may hold.
    OutOfRange {
        /// What the field is.
        field: &'static str,
        /// What it holds.
        value: i64,
        /// What it may hold.
        allowed: &'static str,
    },
    /// No symbol of an element.
    UnknownElement {
        /// As written.
        symbol: String,
        /// A symbol that may be meant.
        perhaps: Option<&'static str>,
    },
    /// An atom number that no atom has.
    NoSuchAtom {
        /// As written.
        number: i64,
        /// How many atoms there are.
        atoms: usize,
    },
    /// A bond from an atom to itself.
    Loop(usize),
    /// A second bond between two atoms, and the line of the first.
    Twice {
        /// The two atoms, from 1.
        atoms: (usize, usize),
        /// Line of the first bond.
        first: usize,
    },
    /// Aromatic bonds for which no alternating single and double bonds can be found (an atom left over).
    NoPattern(usize),
    /// Aromatic bonds that leave open which of these atoms bears a hydrogen.
    SeveralPatterns(Vec<usize>),
    /// Atoms and bonds that make no drawing.
    NoDrawing(String),
    /// A line of notation that is no molecule.
    Notation(smiles::Fault),
}

impl fmt::Display for Reason {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Reason::Empty => write!(f, "there is nothing in it"),
            Reason::Utf16 => write!(f, "the text is in UTF-16"),
            Reason::Binary => write!(f, "this is no text"),
            Reason::NotMolfile => write!(f, "this is no molfile and no SD file"),
            Reason::TooLong(limit) => write!(
                f,
                "the record is longer than {} MB without an end ($$$$)",
                limit / 1_000_000
            ),
            Reason::NoCountsLine => write!(
                f,
                "the counts line (numbers of atoms and bonds, fourth line of a record) is missing"
            ),
            Reason::NotV3000 => write!(
                f,
                "the counts line says V3000, but no line 'M  V30 BEGIN CTAB' follows"
            ),
            Reason::NoPrefix => write!(f, "the line does not start with 'M  V30 '"),
            Reason::Misplaced { found, expected } => {
                write!(f, "'{found}' stands where {expected} should")
            }
            Reason::CountsEntry {
                said: Some(said),
                found,
            } => miscounted(f, "the line COUNTS", *said, *found),
            Reason::CountsEntry { said: None, .. } => write!(
                f,
                "the line COUNTS (numbers of atoms and bonds) is missing behind BEGIN CTAB"
            ),
            Reason::IndexTwice { index, first } => write!(
                f,
                "the index {index} belongs already to the atom of line {first}"
            ),
            Reason::NoSuchIndex(index) => {
                write!(f, "atom {index} is named, but no atom has this index")
            }
            Reason::NeedsV3000 => {
                write!(f, "more than 999 atoms or bonds do not fit a V2000 molfile")
            }
            Reason::Counts { said, found } => miscounted(f, "the counts line", *said, *found),
            Reason::EndsEarly(what) => write!(f, "the record ends before {what}"),
            Reason::Number { field, text } if text.is_empty() => {
                write!(f, "{field} is missing")
            }
            Reason::Number { field, text } => write!(f, "{field} is no number: '{text}'"),
            Reason::OutOfRange {
                field,
                value,
                allowed,
            } => write!(f, "{field} is {value}; it can be {allowed}"),
            Reason::UnknownElement { symbol, .. } => {
                write!(f, "'{symbol}' is no symbol of an element")
            }
            Reason::NoSuchAtom { number, atoms } => {
                write!(f, "atom {number} is named, but atoms go from 1 to {atoms}")
            }
            Reason::Loop(atom) => write!(f, "a bond joins atom {atom} with itself"),
            Reason::Twice { atoms, first } => write!(
                f,
                "atoms {} and {} are joined already by the bond of line {first}",
                atoms.0, atoms.1
            ),
            Reason::NoPattern(atom) => write!(
                f,
                "the aromatic bonds allow no alternating single and double bonds (atom {atom} is left over)"
            ),
            Reason::SeveralPatterns(atoms) => {
                let list: Vec<String> = atoms.iter().map(usize::to_string).collect();
                write!(
                    f,
                    "the aromatic bonds leave open which atom bears hydrogen (of {})",
                    list.join(", ")
                )
            }
            Reason::NoDrawing(why) => f.write_str(why),
            Reason::Notation(fault) => fault.fmt(f),
        }
    }
}

fn miscounted(
    f: &mut fmt::Formatter<'_>,
    line: &str,
    said: (usize, usize),
    found: (usize, usize),
) -> fmt::Result {
    write!(
        f,
        "{line} says {} atoms and {} bonds, but there are {} lines of atoms and {} of bonds",
        said.0, said.1, found.0, found.1
    )
}

impl Reason {
    /// What a person can do about it, in a sentence.
    pub fn remedy(&self) -> String {
        let text = match self {
            Reason::Empty => "Give a molfile or an SD file.",
            Reason::Utf16 => "Save it as UTF-8 or plain ASCII text.",
            Reason::Binary | Reason::NotMolfile => {
                "Give a molfile or an SD file (V2000 or V3000), saved as text."
            }
            Reason::TooLong(_) => "Check that records end with a line $$$$.",
            Reason::NoCountsLine => {
                "Put it back after three header lines, such as '  9  8  0  0  0  0  0  0  0  0999 V2000'."
            }
            Reason::NotV3000 => {
                "If the atoms stand in fixed columns, write V2000 at the end of the counts line."
            }
            Reason::NoPrefix => {
                "Put 'M  V30 ' (two blanks, one blank) before it, and '-' at the end of the line before if it goes on from there."
            }
            Reason::Misplaced { .. } => "Correct the line, or put the lines into their order.",
            Reason::CountsEntry { found, .. } => {
                return format!(
                    "If no line is lost, write 'M  V30 COUNTS {} {} 0 0 0' there.",
                    found.0, found.1
                );
            }
            Reason::IndexTwice { .. } => "Give each atom an index of its own.",
            Reason::NoSuchIndex(_) => "Correct the index.",
            Reason::NeedsV3000 => "It needs a V3000 molfile, or the drawing must be split.",
            Reason::Counts { found, .. } => {
                return format!(
                    "If no line is lost, write {:3}{:3} at the start of the counts line.",
                    found.0, found.1
                );
            }
            Reason::EndsEarly(_) => "Get the whole file again from where it came.",
            Reason::Number { .. } => "Write a number there, in the columns of the format.",
            Reason::OutOfRange { .. } => "Write one of these values.",
            Reason::UnknownElement {
                perhaps: Some(symbol),
                ..
            } => return format!("Write {symbol} if that is meant."),
            Reason::UnknownElement { .. } => {
                "Draw a group with its atoms, or write R# with an alias line (A) for a placeholder."
            }
            Reason::NoSuchAtom { .. } => "Correct the atom number.",
            Reason::Loop(_) => "Remove the bond or correct one of its atom numbers.",
            Reason::Twice { .. } => "Remove one of the two bonds.",
            Reason::NoPattern(_) => {
                "Draw single and double bonds, and the hydrogens or charges that the ring has."
            }
            Reason::SeveralPatterns(_) => {
                "Draw the hydrogen as an atom, or draw single and double bonds."
            }
            Reason::NoDrawing(_) => "Correct the record.",
            Reason::Notation(fault) => return fault.remedy(),
        };
        text.to_owned()
    }
}

/// Why a record cannot be written.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum WriteError {
    /// Extra lines (S-groups and others) of V2000 in a record that needs V3000.
    ExtraLines,
    /// Coordinates of an atom (from 1) that do not fit their columns.
    TooFar(usize),
    /// A number stated of an atom (from 1) that does not fit its columns.
    DoesNotFit {
        /// The atom, from 1.
        atom: usize,
        /// What is too large.
        what: &'static str,
    },
}

impl fmt::Display for WriteError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            WriteError::ExtraLines => write!(
                f,
                "the record needs a V3000 molfile, but has S-group or other lines of V2000; take those away, or the stereo groups"
            ),
            WriteError::TooFar(atom) => write!(
                f,
                "the coordinates of atom {atom} do not fit a molfile (-9999.9999 to 99999.9999); move or scale the drawing"
            ),
            WriteError::DoesNotFit { atom, what } => {
                write!(
                    f,
                    "the {what} of atom {atom} does not fit a molfile; take it away or correct it"
                )
            }
        }
    }
}

impl std::error::Error for WriteError {}
