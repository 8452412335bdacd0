//! The letters themselves.

use std::fmt;

/// A stereodescriptor. Upper-case letters other than E and Z change on reflection; of the lower-case
/// ones only e and z do (IUPAC 2013 recommendations, P-91 and P-92).
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Descriptor {
    /// R, rectus.
    R,
    /// S, sinister.
    S,
    /// r, pseudoasymmetric.
    LowerR,
    /// s, pseudoasymmetric.
    LowerS,
    /// E, entgegen.
    E,
    /// Z, zusammen.
    Z,
    /// e: seqTrans, a double bond whose geometry is reversed by reflection.
    LowerE,
    /// z: seqCis, likewise.
    LowerZ,
    /// M, minus.
    M,
    /// P, plus.
    P,
    /// m, invariant axis.
    LowerM,
    /// p, invariant axis.
    LowerP,
}

use Descriptor as D;

impl Descriptor {
    /// Every descriptor.
    pub const ALL: [Descriptor; 12] = [
        D::R,
        D::S,
        D::LowerR,
        D::LowerS,
        D::E,
        D::Z,
        D::LowerE,
        D::LowerZ,
        D::M,
        D::P,
        D::LowerM,
        D::LowerP,
    ];

    /// Its letter.
    pub fn letter(self) -> char {
        match self {
            D::R => 'R',
            D::S => 'S',
            D::LowerR => 'r',
            D::LowerS => 's',
            D::E => 'E',
            D::Z => 'Z',
            D::LowerE => 'e',
            D::LowerZ => 'z',
            D::M => 'M',
            D::P => 'P',
            D::LowerM => 'm',
            D::LowerP => 'p',
        }
    }

    /// The descriptor with this letter.
    pub fn from_letter(letter: char) -> Option<Descriptor> {
        Descriptor::ALL.into_iter().find(|d| d.letter() == letter)
    }

    /// The descriptor of the same unit in its other configuration, all else unchanged.
    pub fn opposite(self) -> Descriptor {
        match self {
            D::R => D::S,
            D::S => D::R,
            D::LowerR => D::LowerS,
            D::LowerS => D::LowerR,
            D::E => D::Z,
            D::Z => D::E,
            D::LowerE => D::LowerZ,
            D::LowerZ => D::LowerE,
            D::M => D::P,
            D::P => D::M,
            D::LowerM => D::LowerP,
            D::LowerP => D::LowerM,
        }
    }

    /// The descriptor of the unit in the mirror image of the whole molecule.
    pub fn mirrored(self) -> Descriptor {
        match self {
            D::R | D::S | D::M | D::P | D::LowerE | D::LowerZ => self.opposite(),
            D::LowerR | D::LowerS | D::E | D::Z | D::LowerM | D::LowerP => self,
        }
    }
}

impl fmt::Display for Descriptor {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}", self.letter())
    }
}
