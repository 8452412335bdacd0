//! What an item asks for: the descriptors of the grammar.

use crate::stereo::Descriptor;
use std::fmt;

/// A descriptor as a requirement line may hold it.
///
/// Source: IUPAC 2013 recommendations P-91.2.1.1 for the lists of preferred and general descriptors;
/// the common spellings of the trade beside them.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Value {
    /// R S r s E Z e z M P m p.
    Plain(Descriptor),
    /// Ra, of a chirality axis.
    AxialR,
    /// Sa, of a chirality axis.
    AxialS,
    /// Rp, of a chirality plane by the book, of phosphorus among nucleotide chemists.
    PlanarR,
    /// Sp, likewise.
    PlanarS,
    /// R*, relative.
    RelativeR,
    /// S*, relative.
    RelativeS,
    /// RS, a racemate with R cited first.
    RacemicRs,
    /// SR, a racemate with S cited first.
    RacemicSr,
    /// seqCis.
    SeqCis,
    /// seqTrans.
    SeqTrans,
    /// cis.
    Cis,
    /// trans.
    Trans,
    /// Ξ: unknown on purpose.
    Xi,
}

impl Value {
    /// Every value.
    pub const ALL: [Value; 25] = [
        Value::Plain(Descriptor::R),
        Value::Plain(Descriptor::S),
        Value::Plain(Descriptor::LowerR),
        Value::Plain(Descriptor::LowerS),
        Value::Plain(Descriptor::E),
        Value::Plain(Descriptor::Z),
        Value::Plain(Descriptor::LowerE),
        Value::Plain(Descriptor::LowerZ),
        Value::Plain(Descriptor::M),
        Value::Plain(Descriptor::P),
        Value::Plain(Descriptor::LowerM),
        Value::Plain(Descriptor::LowerP),
        Value::AxialR,
        Value::AxialS,
        Value::PlanarR,
        Value::PlanarS,
        Value::RelativeR,
        Value::RelativeS,
        Value::RacemicRs,
        Value::RacemicSr,
        Value::SeqCis,
        Value::SeqTrans,
        Value::Cis,
        Value::Trans,
        Value::Xi,
    ];

    /// The one spelling; `Xi` for the Greek letter.
    pub fn spelled(self) -> &'static str {
        match self {
            Value::Plain(descriptor) => match descriptor {
                Descriptor::R => "R",
                Descriptor::S => "S",
                Descriptor::LowerR => "r",
                Descriptor::LowerS => "s",
                Descriptor::E => "E",
                Descriptor::Z => "Z",
                Descriptor::LowerE => "e",
                Descriptor::LowerZ => "z",
                Descriptor::M => "M",
                Descriptor::P => "P",
                Descriptor::LowerM => "m",
                Descriptor::LowerP => "p",
            },
            Value::AxialR => "Ra",
            Value::AxialS => "Sa",
            Value::PlanarR => "Rp",
            Value::PlanarS => "Sp",
            Value::RelativeR => "R*",
            Value::RelativeS => "S*",
            Value::RacemicRs => "RS",
            Value::RacemicSr => "SR",
            Value::SeqCis => "seqCis",
            Value::SeqTrans => "seqTrans",
            Value::Cis => "cis",
            Value::Trans => "trans",
            Value::Xi => "Xi",
        }
    }

    /// The descriptor that one unit must carry, whatever the others carry. None for a value that says
    /// more or less than that: R*, RS, cis, Ξ.
    ///
    /// Ra = M and Sa = P, but Rp = P and Sp = M: the senses follow from the definitions of both and
    /// were worked out on coordinates. Rp and Sp are taken as planes here.
    pub fn descriptor(&self) -> Option<Descriptor> {
        match self {
            Value::Plain(descriptor) => Some(*descriptor),
            Value::AxialR | Value::PlanarS => Some(Descriptor::M),
            Value::AxialS | Value::PlanarR => Some(Descriptor::P),
            Value::SeqCis => Some(Descriptor::LowerZ),
            Value::SeqTrans => Some(Descriptor::LowerE),
            Value::RelativeR
            | Value::RelativeS
            | Value::RacemicRs
            | Value::RacemicSr
            | Value::Cis
            | Value::Trans
            | Value::Xi => None,
        }
    }

    /// The descriptor to draw: that of [`Value::descriptor`], or R for R* and RS, S for S* and SR, of
    /// which one enantiomer is drawn for both.
    pub fn drawn(&self) -> Option<Descriptor> {
        match self {
            Value::RelativeR | Value::RacemicRs => Some(Descriptor::R),
            Value::RelativeS | Value::RacemicSr => Some(Descriptor::S),
            Value::Plain(_)
            | Value::AxialR
            | Value::AxialS
            | Value::PlanarR
            | Value::PlanarS
            | Value::SeqCis
            | Value::SeqTrans
            | Value::Cis
            | Value::Trans
            | Value::Xi => self.descriptor(),
        }
    }

    /// cis or trans.
    pub fn is_cis_trans(self) -> bool {
        matches!(self, Value::Cis | Value::Trans)
    }

    /// R* or S*.
    pub fn is_starred(self) -> bool {
        matches!(self, Value::RelativeR | Value::RelativeS)
    }

    /// RS or SR.
    pub fn is_racemic(self) -> bool {
        matches!(self, Value::RacemicRs | Value::RacemicSr)
    }

    /// Whether it names one enantiomer out of two: the mirror image has another descriptor.
    pub(super) fn is_absolute(self) -> bool {
        self.descriptor().is_some_and(|d| d.mirrored() != d)
    }

    /// Whether `other` is the other one of the same pair, as in R/S.
    pub(super) fn is_opposite(self, other: Value) -> bool {
        let pair = |a, b| (self == a && other == b) || (self == b && other == a);
        match (self, other) {
            (Value::Plain(a), Value::Plain(b)) => a.opposite() == b,
            _ => {
                pair(Value::AxialR, Value::AxialS)
                    || pair(Value::PlanarR, Value::PlanarS)
                    || pair(Value::RelativeR, Value::RelativeS)
                    || pair(Value::RacemicRs, Value::RacemicSr)
                    || pair(Value::SeqCis, Value::SeqTrans)
                    || pair(Value::Cis, Value::Trans)
            }
        }
    }

    /// Number of the kind of unit it belongs to; "all" speaks of one kind. Own rule.
    pub(super) fn kind(self) -> u8 {
        match self {
            Value::Plain(Descriptor::R | Descriptor::S)
            | Value::RelativeR
            | Value::RelativeS
            | Value::RacemicRs
            | Value::RacemicSr => 0,
            Value::Plain(Descriptor::LowerR | Descriptor::LowerS) => 1,
            Value::Plain(Descriptor::E | Descriptor::Z) => 2,
            Value::Plain(Descriptor::LowerE | Descriptor::LowerZ)
            | Value::SeqCis
            | Value::SeqTrans => 3,
            Value::Plain(Descriptor::M | Descriptor::P) | Value::AxialR | Value::AxialS => 4,
            Value::Plain(Descriptor::LowerM | Descriptor::LowerP) => 5,
            Value::PlanarR | Value::PlanarS => 6,
            Value::Cis | Value::Trans => 7,
            Value::Xi => 8,
        }
    }
}

impl fmt::Display for Value {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.spelled())
    }
}
