//! Why a line is no molecule, where, and what to do.

use std::fmt;

/// Why a line cannot be read, and where.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct SmilesError {
    /// Column of the line, from 1, counted in characters.
    pub column: usize,
    /// What is wrong.
    pub reason: Fault,
}

impl SmilesError {
    pub(super) fn new(column: usize, reason: Fault) -> SmilesError {
        SmilesError { column, reason }
    }

    /// What to do about it, in a sentence.
    pub fn remedy(&self) -> String {
        self.reason.remedy()
    }
}

impl fmt::Display for SmilesError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(
            f,
            "column {}: {}. {}",
            self.column,
            self.reason,
            self.remedy()
        )
    }
}

impl std::error::Error for SmilesError {}

/// What is wrong with a line.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Fault {
    /// No molecule in it.
    Empty,
    /// More characters than are read (the limit).
    TooLong(usize),
    /// Rings or delocalised systems so large that they would take minutes.
    TooLarge,
    /// A character that has no meaning there.
    Sign(char),
    /// A symbol of no element, or of one that needs brackets.
    Symbol {
        /// As written.
        text: String,
        /// As it may be meant.
        perhaps: Option<String>,
    },
    /// A bracket without its end.
    OpenBracket,
    /// A bracket with something in it that does not belong there, or not in this order.
    InBracket(String),
    /// A number beyond what its place may hold.
    OutOfRange {
        /// What it is.
        what: &'static str,
        /// The largest value.
        most: u32,
    },
    /// `@?` of older programs.
    UnknownCentre,
    /// A centre of more than two arrangements.
    ManyArrangements(&'static str),
    /// A chirality class that does not exist.
    ChiralClass(String),
    /// A bond of order four.
    Quadruple,
    /// A bond without an atom before or after it.
    LooseBond,
    /// Two bond symbols in a row.
    TwoBonds,
    /// A full stop without an atom before or after it.
    LooseDot,
    /// A ring number without an atom before it.
    LooseRing,
    /// A ring number that is not closed.
    OpenRing(u32),
    /// A ring number without two digits after `%`.
    RingNumber,
    /// Both sides of a ring bond say different things.
    RingBonds(u32),
    /// A ring number closed at its own atom.
    Loop,
    /// A ring number that joins two atoms joined already.
    Twice,
    /// A branch without an atom before it.
    LooseBranch,
    /// A branch with nothing in it, or that begins with what cannot begin one.
    EmptyBranch,
    /// A branch that is not closed.
    OpenBranch,
    /// A closing bracket without its branch.
    Unopened,
    /// `:` at an atom that is not written as aromatic.
    AromaticBond,
    /// A lower-case atom outside of rings.
    AromaticAtom,
    /// No alternating single and double bonds for lower-case atoms (an atom, from 1, is left over).
    NoPattern(usize),
    /// It is open which of these atoms (from 1) goes without a double bond.
    SeveralPatterns(Vec<usize>),
    /// `/` and `\` at one end of a double bond put both of its ligands on the same side.
    SameSide,
    /// An atom number of the tail that no atom has.
    NoSuchAtom {
        /// As written, from 0.
        number: u32,
        /// How many atoms there are.
        atoms: usize,
    },
    /// A part of the tail that should hold atom numbers.
    TailNumbers(String),
    /// An atom in two groups of the tail.
    TwoGroups(usize),
    /// Coordinates that are no numbers.
    Coordinate(String),
    /// Coordinates for another number of atoms.
    Coordinates {
        /// Places given.
        places: usize,
        /// Atoms there are.
        atoms: usize,
    },
    /// What the molecule's own check says.
    NoMolecule(String),
}

impl fmt::Display for Fault {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Fault::Empty => write!(f, "there is no molecule"),
            Fault::TooLong(limit) => write!(f, "the line is longer than {limit} characters"),
            Fault::TooLarge => write!(f, "a ring system of this size is not read"),
            Fault::Sign(sign) => write!(f, "'{}' means nothing here", sign.escape_default()),
            Fault::Symbol { text, .. } => write!(f, "'{text}' is no atom here"),
            Fault::OpenBracket => write!(f, "the bracket [ is not closed"),
            Fault::InBracket(text) => write!(f, "'{text}' does not belong here in a bracket"),
            Fault::OutOfRange { what, most } => write!(f, "{what} is larger than {most}"),
            Fault::UnknownCentre => write!(f, "@? is no sign of the notation"),
            Fault::ManyArrangements(shape) => {
                write!(
                    f,
                    "{shape} centres have more than two arrangements and are not handled"
                )
            }
            Fault::ChiralClass(text) => write!(f, "'{text}' names no arrangement"),
            Fault::Quadruple => write!(f, "quadruple bonds are not handled"),
            Fault::LooseBond => write!(f, "this bond has no atom at one of its ends"),
            Fault::TwoBonds => write!(f, "two bond signs stand in a row"),
            Fault::LooseDot => write!(f, "this dot has no atom on one of its sides"),
            Fault::LooseRing => write!(f, "this ring number has no atom before it"),
            Fault::OpenRing(number) => write!(f, "ring number {number} is not closed"),
            Fault::RingNumber => write!(f, "% must be followed by two digits"),
            Fault::RingBonds(number) => {
                write!(
                    f,
                    "the two bond signs of ring number {number} contradict each other"
                )
            }
            Fault::Loop => write!(f, "this ring number joins an atom with itself"),
            Fault::Twice => write!(
                f,
                "this ring number joins two atoms that are joined already"
            ),
            Fault::LooseBranch => write!(f, "this branch has no atom before it"),
            Fault::EmptyBranch => write!(f, "a branch must begin with a bond or an atom"),
            Fault::OpenBranch => write!(f, "this branch is not closed"),
            Fault::Unopened => write!(f, "this ) closes no branch"),
            Fault::AromaticBond => write!(f, "an aromatic bond joins atoms in lower case only"),
            Fault::AromaticAtom => write!(f, "an atom in lower case lies in no ring"),
            Fault::NoPattern(atom) => write!(
                f,
                "the atoms in lower case allow no alternating single and double bonds (atom {atom} is left over)"
            ),
            Fault::SeveralPatterns(atoms) => {
                let list: Vec<String> = atoms.iter().map(usize::to_string).collect();
                write!(
                    f,
                    "it is open which of the atoms {} has no double bond",
                    list.join(", ")
                )
            }
            Fault::SameSide => write!(
                f,
                "/ and \\ put both ligands of this double bond's end on the same side"
            ),
            Fault::NoSuchAtom { number, atoms } => write!(
                f,
                "atom {number} is named, but atoms go from 0 to {}",
                atoms.saturating_sub(1)
            ),
            Fault::TailNumbers(text) => write!(f, "'{text}' is no atom number"),
            Fault::TwoGroups(atom) => write!(f, "atom {atom} stands in two groups"),
            Fault::Coordinate(text) => write!(f, "'{text}' is no coordinate"),
            Fault::Coordinates { places, atoms } => {
                write!(f, "there are {places} places for {atoms} atoms")
            }
            Fault::NoMolecule(text) => f.write_str(text),
        }
    }
}

impl Fault {
    /// What to do about it, in a sentence.
    pub fn remedy(&self) -> String {
        let text = match self {
            Fault::Empty => "Write at least one atom.",
            Fault::TooLong(_) | Fault::TooLarge => "Split the molecule.",
            Fault::Sign(sign) if !sign.is_ascii() => {
                "The notation has plain ASCII signs only; write a blank before a name."
            }
            Fault::Sign('~') => "Write the order of the bond: - = or #.",
            Fault::Sign('>') => "Reactions are not handled; give one molecule a line.",
            Fault::Sign('{' | '}') => "Write atoms in square brackets.",
            Fault::Sign(']') => "Write [ before the atom.",
            Fault::Sign(_) => "Take it away.",
            Fault::Symbol {
                perhaps: Some(text),
                ..
            } => return format!("Write {text} if that is meant."),
            Fault::Symbol { .. } => "Write the symbol of an element.",
            Fault::OpenBracket => "Write ].",
            Fault::InBracket(_) => {
                "Write isotope, symbol, @, H, charge and class in this order, such as [13C@@H+:1]."
            }
            Fault::OutOfRange { .. } => "Write a smaller number.",
            Fault::UnknownCentre => "Write no @ for an unknown centre.",
            Fault::ManyArrangements(_) => "Take the sign away; the other centres keep theirs.",
            Fault::ChiralClass(_) => "Write @ or @@.",
            Fault::Quadruple => "Write a bond of another order.",
            Fault::LooseBond => "Write the atom, or take the bond away.",
            Fault::TwoBonds => "Leave one of them.",
            Fault::LooseDot => "Write the other part, or take the dot away.",
            Fault::LooseRing => "Write ring numbers directly after their atom.",
            Fault::OpenRing(_) => {
                "Write the number once more, after the atom that closes the ring."
            }
            Fault::RingNumber => "Write %10, or one digit without %.",
            Fault::RingBonds(_) => "Write the sign of a ring bond on one side only.",
            Fault::Loop => "Write the second number after another atom.",
            Fault::Twice => "Take one of the two bonds away.",
            Fault::LooseBranch => "Write an atom before (.",
            Fault::EmptyBranch => "Write an atom in it, or take the brackets away.",
            Fault::OpenBranch => "Write ).",
            Fault::Unopened => "Take it away, or write ( where the branch begins.",
            Fault::AromaticBond => "Write the bond as - or =, or both atoms in lower case.",
            Fault::AromaticAtom => "Write it in upper case.",
            Fault::NoPattern(_) => {
                "Write the hydrogen that the ring bears, such as [nH], or its charge, or upper case and double bonds."
            }
            Fault::SeveralPatterns(_) => "Write single and double bonds and upper case.",
            Fault::SameSide => "Turn one of the two signs, or take one away.",
            Fault::NoSuchAtom { .. } | Fault::TailNumbers(_) => {
                "Numbers of the tail count the atoms from 0, in the order of the line."
            }
            Fault::TwoGroups(_) => "Leave it in one.",
            Fault::Coordinate(_) | Fault::Coordinates { .. } => {
                "Write one place x,y, for each atom, with ; between them."
            }
            Fault::NoMolecule(_) => "Correct the line.",
        };
        text.to_owned()
    }
}
