//! The words of a line: descriptors, status words, and those that are known and declined.

use super::Status;
use super::value::Value;
use crate::stereo::Descriptor;

/// A descriptor as spelled in the line.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Spelled {
    /// What it means.
    pub(super) value: Value,
    /// The element it names, as in `R_P`.
    pub(super) element: Option<&'static str>,
    /// Whether both geometries are named.
    pub(super) mixed: bool,
}

/// Symbols of heteroatoms that may stand as locants, longer ones first.
pub(super) const HETEROATOMS: [&str; 9] = ["As", "Si", "Ge", "Se", "Te", "N", "O", "P", "B"];

/// Symbols that may stand behind a descriptor, as in `R_P`.
const SUFFIXES: [&str; 6] = ["P", "S", "N", "Si", "As", "C"];

/// Whether an element with a locant is written in front of its descriptor; S and C are only behind.
pub(super) fn is_heteroatom(symbol: &str) -> bool {
    HETEROATOMS.contains(&symbol)
}

/// The descriptor that a word is, if it is one.
pub(super) fn descriptor(word: &str) -> Option<Spelled> {
    let plain = |value| {
        Some(Spelled {
            value,
            element: None,
            mixed: false,
        })
    };
    let mut chars = word.chars();
    if let (Some(c), None) = (chars.next(), chars.next())
        && let Some(d) = Descriptor::from_letter(c)
    {
        return plain(Value::Plain(d));
    }
    match word {
        "Ra" | "aR" | "R_a" => return plain(Value::AxialR),
        "Sa" | "aS" | "S_a" => return plain(Value::AxialS),
        "Rp" | "pR" | "R_p" => return plain(Value::PlanarR),
        "Sp" | "pS" | "S_p" => return plain(Value::PlanarS),
        "R*" => return plain(Value::RelativeR),
        "S*" => return plain(Value::RelativeS),
        "RS" => return plain(Value::RacemicRs),
        "SR" => return plain(Value::RacemicSr),
        "Ξ" | "xi" | "Xi" | "?" => return plain(Value::Xi),
        "EZ" => {
            return Some(Spelled {
                value: Value::Xi,
                element: None,
                mixed: true,
            });
        }
        _ => {}
    }
    for value in [Value::SeqCis, Value::SeqTrans, Value::Cis, Value::Trans] {
        if word.eq_ignore_ascii_case(value.spelled()) {
            return plain(value);
        }
    }
    let (letter, symbol) = word.split_once('_')?;
    let element = SUFFIXES.into_iter().find(|s| *s == symbol)?;
    let value = match letter {
        "R" => Descriptor::R,
        "S" => Descriptor::S,
        "r" => Descriptor::LowerR,
        "s" => Descriptor::LowerS,
        _ => return None,
    };
    Some(Spelled {
        value: Value::Plain(value),
        element: Some(element),
        mixed: false,
    })
}

const STATUS: [(&str, Status); 7] = [
    ("rac", Status::Rac),
    ("racem", Status::Rac),
    ("racemic", Status::Rac),
    ("rel", Status::Rel),
    ("relative", Status::Rel),
    ("meso", Status::Meso),
    ("abs", Status::Abs),
];

/// The status that a word says, in any case.
pub(super) fn status(word: &str) -> Option<Status> {
    STATUS
        .into_iter()
        .find(|(name, _)| word.eq_ignore_ascii_case(name))
        .map(|(_, status)| status)
}

/// Whether a word is D, L or DL.
pub(super) fn is_dl(word: &str) -> bool {
    matches!(word, "D" | "L" | "DL")
}

/// Words that name stereochemistry and are not handled.
const DECLINED: [&str; 19] = [
    "erythro", "threo", "syn", "anti", "endo", "exo", "fac", "mer", "pro", "proR", "proS", "ent",
    "epi", "lk", "like", "unlike", "gauche", "delta", "lambda",
];

/// Whether a word names stereochemistry that is not handled. Single letters and Re, Si in their own
/// case; `c` and `t` only where nothing else could be meant, next to a locant or in brackets.
pub(super) fn is_declined(word: &str, sure: bool) -> bool {
    matches!(
        word,
        "Re" | "Si" | "re" | "si" | "l" | "u" | "d" | "dl" | "ul" | "Δ" | "Λ" | "α" | "β"
    ) || (sure && matches!(word, "c" | "t"))
        || DECLINED.iter().any(|d| d.eq_ignore_ascii_case(word))
}

/// Polyhedral symbols that stand before a hyphen and the coordination number (`OC-6-12`).
///
/// Source: IUPAC 2005 inorganic recommendations IR-9.3.2.1, from memory.
const POLYHEDRA: [&str; 18] = [
    "T", "SP", "SPY", "SS", "TBPY", "TP", "TPY", "TS", "OC", "TPR", "PBPY", "OCF", "TPRS", "CU",
    "SAPR", "DD", "HBPY", "TPRT",
];

/// Whether a word is a polyhedral symbol.
pub(super) fn is_polyhedron(word: &str) -> bool {
    POLYHEDRA.contains(&word)
}

/// Whether a word is several capital descriptors run together, as `SS`, `RRS`, `Rs`, `RaSa`.
pub(super) fn is_run_together(word: &str) -> bool {
    let mut count = 0;
    let mut chars = word.chars().peekable();
    while let Some(c) = chars.next() {
        let known = if count == 0 {
            matches!(c, 'R' | 'S' | 'E' | 'Z' | 'M' | 'P')
        } else {
            matches!(c, 'R' | 'S' | 'r' | 's' | 'E' | 'Z' | 'M' | 'P')
        };
        if !known {
            return false;
        }
        count += 1;
        if matches!(c, 'R' | 'S') {
            chars.next_if(|n| matches!(n, 'a' | 'p' | '*'));
        }
    }
    count > 1
}

/// Whether a word may be part of a chemical name and no word of the grammar.
fn is_name_word(word: &str) -> bool {
    let known = status(word).is_some()
        || descriptor(word).is_some()
        || is_declined(word, true)
        || ["all", "and", "or"]
            .iter()
            .any(|k| k.eq_ignore_ascii_case(word));
    let mut run = 0;
    !known
        && word.chars().any(|c| {
            run = if c.is_ascii_lowercase() { run + 1 } else { 0 };
            run == 3
        })
}

/// Whether a stretch of text reads like a chemical name.
pub(super) fn is_name_like(text: &[char]) -> bool {
    text.split(|c| !c.is_alphabetic())
        .any(|word| is_name_word(&word.iter().collect::<String>()))
}

/// The word of the grammar that a mistyped one comes near to.
pub(super) fn nearest(word: &str) -> Option<&'static str> {
    let letters = word.chars().count();
    let own_case = Value::ALL
        .into_iter()
        .map(Value::spelled)
        .find(|s| s.eq_ignore_ascii_case(word));
    if own_case.is_some() || !(3..=24).contains(&letters) {
        return own_case;
    }
    let words = Value::ALL
        .into_iter()
        .map(Value::spelled)
        .chain(STATUS.into_iter().map(|(name, _)| name))
        .filter(|s| s.len() > 2);
    words
        .map(|s| (distance(&s.to_ascii_lowercase(), &word.to_lowercase()), s))
        .filter(|(steps, s)| {
            *steps
                <= if s.len() < 5 {
                    1
                } else {
                    letters.div_ceil(4) + 1
                }
        })
        .min_by_key(|(steps, s)| (*steps, std::cmp::Reverse(s.len())))
        .map(|(_, s)| s)
}

/// How many letters to put in, take out or change.
fn distance(a: &str, b: &str) -> usize {
    let b: Vec<char> = b.chars().collect();
    let mut row: Vec<usize> = (0..=b.len()).collect();
    for (i, x) in a.chars().enumerate() {
        let mut next = vec![i + 1];
        let mut left = i + 1;
        for (y, above) in b.iter().zip(row.windows(2)) {
            if let [diagonal, up] = above {
                left = (left + 1).min(up + 1).min(diagonal + usize::from(x != *y));
                next.push(left);
            }
        }
        row = next;
    }
    row.last().copied().unwrap_or(0)
}
