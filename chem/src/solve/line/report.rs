//! What is said about a line: notes on a line that was read, the error on one that was not.

use std::fmt;

/// Something the reader of a line noticed and did not refuse. In the order of the codes.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Note {
    /// A descriptor that names the element it belongs to.
    AtomSuffix,
    /// No brackets.
    Bare,
    /// Other brackets than parentheses, or doubled ones.
    Bracket,
    /// The same item twice.
    Duplicate,
    /// A name behind the descriptors.
    NameTail,
    /// Items not separated by a comma.
    NoComma,
    /// The status said twice.
    Redundant,
    /// Other separators.
    Separator,
    /// cis or trans.
    CisTrans,
    /// D or L in the name behind the descriptors.
    Dl,
    /// Descriptors inside the name behind the descriptors, as typed there.
    Inner(Vec<String>),
    /// Lower-case e or z.
    LowerEz,
    /// Both geometries of a double bond.
    MixedEz,
    /// No descriptors.
    NoItems,
    /// Only some centers starred or RS.
    Partial,
    /// Rp or Sp.
    PlaneOrPhosphorus,
    /// Several descriptors without locants.
    Unlocated,
    /// A center unknown on purpose.
    Xi,
}

impl Note {
    /// Stable name: `I-` informs, `W-` wants a look before the line is used.
    pub fn code(&self) -> &'static str {
        match self {
            Note::AtomSuffix => "I-ATOM-SUFFIX",
            Note::Bare => "I-BARE",
            Note::Bracket => "I-BRACKET",
            Note::Duplicate => "I-DUP",
            Note::NameTail => "I-NAME-TAIL",
            Note::NoComma => "I-NOCOMMA",
            Note::Redundant => "I-REDUNDANT",
            Note::Separator => "I-SEP",
            Note::CisTrans => "W-CISTRANS",
            Note::Dl => "W-DL",
            Note::Inner(_) => "W-INNER",
            Note::LowerEz => "W-LOWER-EZ",
            Note::MixedEz => "W-MIXED-EZ",
            Note::NoItems => "W-NO-ITEMS",
            Note::Partial => "W-PARTIAL",
            Note::PlaneOrPhosphorus => "W-RP",
            Note::Unlocated => "W-UNLOCATED",
            Note::Xi => "W-XI",
        }
    }

    /// Whether the line should be confirmed before it is used.
    pub fn is_warning(&self) -> bool {
        self.code().starts_with('W')
    }

    /// A sentence for a practitioner.
    pub fn text(&self) -> String {
        let text = match self {
            Note::AtomSuffix => {
                "a descriptor names its element (R_P): where no locant stands before it, the element is the locant"
            }
            Note::Bare => "no brackets were typed; the line is read as if they stood there",
            Note::Bracket => "other or doubled brackets are read as one pair of parentheses",
            Note::Duplicate => "the same item stands twice; it is taken once",
            Note::NameTail => "the name behind the descriptors is not used",
            Note::NoComma => "items without a comma between them are read as separate items",
            Note::Redundant => "the status is said twice",
            Note::Separator => {
                "other signs than commas separate the parts; they are read all the same"
            }
            Note::CisTrans => {
                "cis and trans compare two substituents that must be chosen; they are no CIP descriptors"
            }
            Note::Dl => {
                "the name holds D or L, which is not used: check that the descriptors agree with it"
            }
            Note::Inner(found) => {
                return format!(
                    "the name holds descriptors of a substituent with its own numbering, which are not used: {}",
                    found.join(" ")
                );
            }
            Note::LowerEz => {
                "lower-case e and z stand for seqTrans and seqCis; if E or Z is meant, type the capital"
            }
            Note::MixedEz => "both E and Z are named: the double bond is left open",
            Note::NoItems => "no descriptors were given: no configuration is asked for",
            Note::Partial => {
                "only some centres are starred or RS: the others are taken as absolute. If all are meant, use rel- or rac-"
            }
            Note::PlaneOrPhosphorus => {
                "Rp and Sp mean a chirality plane, but phosphorus among nucleotide chemists: check which one is meant"
            }
            Note::Unlocated => {
                "several descriptors without locants: which atom carries which cannot be told from the line"
            }
            Note::Xi => "a centre or double bond is left unknown on purpose",
        };
        text.to_owned()
    }
}

/// Why a line cannot be read.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct LineError {
    /// Stable name of the reason (`E-UNKNOWN`).
    pub code: &'static str,
    /// Place in the line as typed, in characters from 1; 0 for the whole line.
    pub column: usize,
    /// What is wrong and what to do.
    pub text: String,
}

impl LineError {
    pub(super) fn new(code: &'static str, column: usize, text: impl Into<String>) -> LineError {
        LineError {
            code,
            column,
            text: text.into(),
        }
    }

    /// Of the whole line.
    pub(super) fn whole(code: &'static str, text: impl Into<String>) -> LineError {
        LineError::new(code, 0, text)
    }
}

impl fmt::Display for LineError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self.column {
            0 => f.write_str(&self.text),
            column => write!(f, "column {column}: {}", self.text),
        }
    }
}

impl std::error::Error for LineError {}
