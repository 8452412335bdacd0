//! Lines that are read, and what they are read as; lines that are refused, and where.

use crate::solve::line::{Item, Note, read};

/// Line, status, items, sign of rotation, notes.
pub(super) type Accepted = (
    &'static str,
    &'static str,
    &'static [&'static str],
    &'static str,
    &'static [&'static str],
);

/// Forms of IUPAC 2013 recommendations P-91.2.1.1, P-91.2.1.2.1, P-46.3, P-93.1.2, P-93.1.3 and of IUPAC
/// 1993 guide R-7.1.2, R-7.2.2; what lies beyond them is an own rule.
#[rustfmt::skip]
const ACCEPTED: &[Accepted] = &[
    ("(S)-", "abs", &[":S"], "", &[]),
    ("(1R,2S)", "abs", &["1:R", "2:S"], "", &[]),
    ("1R,2S", "abs", &["1:R", "2:S"], "", &["I-BARE"]),
    ("1R 2S", "abs", &["1:R", "2:S"], "", &["I-BARE", "I-NOCOMMA"]),
    ("1R;2S", "abs", &["1:R", "2:S"], "", &["I-BARE", "I-SEP"]),
    ("(1R2S)", "abs", &["1:R", "2:S"], "", &["I-NOCOMMA"]),
    ("(2R,3R)-2,3-dihydroxybutanedioic acid", "abs", &["2:R", "3:R"], "", &["I-NAME-TAIL"]),
    ("(Z)-but-2-ene", "abs", &[":Z"], "", &["I-NAME-TAIL"]),
    ("(2Z,4R,5E)", "abs", &["2:Z", "4:R", "5:E"], "", &[]),
    ("(1(10)E,4E)", "abs", &["1(10):E", "4:E"], "", &[]),
    ("(3aR,7aS)", "abs", &["3a:R", "7a:S"], "", &[]),
    ("(3aR,4S,7R,7aS)", "abs", &["3a:R", "4:S", "7:R", "7a:S"], "", &[]),
    ("(2R,2'S)", "abs", &["2:R", "2':S"], "", &[]),
    ("(1R,3a1S)", "abs", &["1:R", "3a1:S"], "", &[]),
    ("(NR)", "abs", &["N:R"], "", &[]),
    ("(N2E)", "abs", &["N2:E"], "", &[]),
    ("(αR)", "abs", &["α:R"], "", &[]),
    ("(R_P)", "abs", &["P:R"], "", &["I-ATOM-SUFFIX"]),
    ("(S_S)", "abs", &["S:S"], "", &["I-ATOM-SUFFIX"]),
    ("(Ra)", "abs", &[":Ra"], "", &[]),
    ("(Sa)", "abs", &[":Sa"], "", &[]),
    ("(aR)", "abs", &[":Ra"], "", &[]),
    ("(4Ra)", "abs", &["4:Ra"], "", &[]),
    ("(M)", "abs", &[":M"], "", &[]),
    ("(P)", "abs", &[":P"], "", &[]),
    ("(1M)", "abs", &["1:M"], "", &[]),
    ("(4P)", "abs", &["4:P"], "", &[]),
    ("(1r,4r)", "abs", &["1:r", "4:r"], "", &[]),
    ("rac-(R)", "rac", &[":R"], "", &[]),
    ("rac-", "rac", &[], "", &["W-NO-ITEMS"]),
    ("racemic", "rac", &[], "", &["W-NO-ITEMS"]),
    ("(rac)-(1R,2S)", "rac", &["1:R", "2:S"], "", &[]),
    ("(1R*,2S*)", "rel", &["1:R*", "2:S*"], "", &[]),
    ("(R*,S*)", "rel", &[":R*", ":S*"], "", &["W-UNLOCATED"]),
    ("rel-(1R*,2S*)", "rel", &["1:R*", "2:S*"], "", &["I-REDUNDANT"]),
    ("(1RS,2SR)", "rac", &["1:RS", "2:SR"], "", &[]),
    ("(RS)", "rac", &[":RS"], "", &[]),
    ("(1RS)", "rac", &["1:RS"], "", &[]),
    ("(±)", "rac", &[], "±", &["W-NO-ITEMS"]),
    ("(±)-(1R,2S)", "rac", &["1:R", "2:S"], "±", &[]),
    ("(+/-)-(1R,2S)", "rac", &["1:R", "2:S"], "±", &[]),
    ("(+)-(R)", "abs", &[":R"], "+", &[]),
    ("(−)-(2S,3R)", "abs", &["2:S", "3:R"], "-", &[]),
    ("(1Ξ)", "abs", &["1:Xi"], "", &["W-XI"]),
    ("(2R,3Ξ)", "abs", &["2:R", "3:Xi"], "", &["W-XI"]),
    ("(2R,3?)", "abs", &["2:R", "3:Xi"], "", &["W-XI"]),
    ("(1Ξ,2Ξ)", "abs", &["1:Xi", "2:Xi"], "", &["W-XI"]),
    ("(R,R)", "abs", &[":R", ":R"], "", &["W-UNLOCATED"]),
    ("(S,S)", "abs", &[":S", ":S"], "", &["W-UNLOCATED"]),
    ("cis-1,2", "abs", &["1,2:cis"], "", &["W-CISTRANS"]),
    ("(1,2-trans)", "abs", &["1,2:trans"], "", &["W-CISTRANS"]),
    ("trans-4-methylcyclohexanol", "abs", &[":trans"], "", &["I-NAME-TAIL", "W-CISTRANS"]),
    ("(E/Z)", "abs", &[":Xi"], "", &["W-MIXED-EZ", "W-XI"]),
    ("meso-(2R,3S)", "meso", &["2:R", "3:S"], "", &[]),
    ("meso", "meso", &[], "", &["W-NO-ITEMS"]),
    ("[1R,2S]", "abs", &["1:R", "2:S"], "", &["I-BRACKET"]),
    ("((1R,2S))", "abs", &["1:R", "2:S"], "", &["I-BRACKET"]),
    ("(2:R,3:S)", "abs", &["2:R", "3:S"], "", &["I-SEP"]),
    ("2=R, 3=S", "abs", &["2:R", "3:S"], "", &["I-BARE", "I-SEP"]),
    ("C2:R, C3:S", "abs", &["2:R", "3:S"], "", &["I-BARE", "I-SEP"]),
    ("(1R)-(2S)", "abs", &["1:R", "2:S"], "", &[]),
    ("(1R,2S)(3E)", "abs", &["1:R", "2:S", "3:E"], "", &[]),
    ("(2E)-(4R)", "abs", &["2:E", "4:R"], "", &[]),
    ("(1R,1R)", "abs", &["1:R"], "", &["I-DUP"]),
    ("(1<em>R</em>,2<em>S</em>)", "abs", &["1:R", "2:S"], "", &[]),
    ("（1Ｒ，2Ｓ）", "abs", &["1:R", "2:S"], "", &[]),
    ("(2e,4z)", "abs", &["2:e", "4:z"], "", &["W-LOWER-EZ"]),
    ("(1m)", "abs", &["1:m"], "", &[]),
    ("(2seqCis)", "abs", &["2:seqCis"], "", &[]),
    ("(2Z,4seqTrans)", "abs", &["2:Z", "4:seqTrans"], "", &[]),
    ("abs-(1R,2S)", "abs", &["1:R", "2:S"], "", &[]),
    ("(12R,13S,3'E)", "abs", &["12:R", "13:S", "3':E"], "", &[]),
    ("(1aR)", "abs", &["1a:R"], "", &[]),
    ("(4aP)", "abs", &["4a:P"], "", &[]),
    ("(3E)-", "abs", &["3:E"], "", &[]),
    ("R,R", "abs", &[":R", ":R"], "", &["I-BARE", "W-UNLOCATED"]),
    ("trans,trans", "abs", &[":trans", ":trans"], "", &["W-CISTRANS", "W-UNLOCATED"]),
    ("cis-1,2-dimethylcyclohexane", "abs", &["1,2:cis"], "", &["I-NAME-TAIL", "W-CISTRANS"]),
    ("rac-(1R)-1-phenylethanol", "rac", &["1:R"], "", &["I-NAME-TAIL"]),
    ("(2R,4S,7E)", "abs", &["2:R", "4:S", "7:E"], "", &[]),
    ("(3R,4'S,5''R)", "abs", &["3:R", "4':S", "5'':R"], "", &[]),
    ("(SiR)", "abs", &["Si:R"], "", &[]),
    ("(S_P)", "abs", &["P:S"], "", &["I-ATOM-SUFFIX"]),
    ("(5S,9Ξ)", "abs", &["5:S", "9:Xi"], "", &["W-XI"]),
    ("(Z,E)", "abs", &[":Z", ":E"], "", &["W-UNLOCATED"]),
    ("1R,2R,4S", "abs", &["1:R", "2:R", "4:S"], "", &["I-BARE"]),
];

/// Line, code, column.
pub(super) type Refused = (&'static str, &'static str, usize);

/// Own rules, but for the order of locant and descriptor: IUPAC 1993 guide R-7.1.2.
#[rustfmt::skip]
const REFUSED: &[Refused] = &[
    ("()", "E-EMPTY", 2),
    ("1R,2S)", "E-UNBALANCED", 6),
    ("(1R,2S]", "E-UNBALANCED", 7),
    ("(1R,)", "E-EMPTY", 5),
    ("(,1R)", "E-EMPTY", 2),
    ("(1,2S)", "E-NO-DESC", 2),
    ("(1R,2)", "E-NO-DESC", 5),
    ("(12)", "E-NO-DESC", 2),
    ("(1X)", "E-UNKNOWN", 2),
    ("(1R,1S)", "E-CONFLICT", 0),
    ("(1.5R)", "E-LOCANT", 2),
    ("(-1R)", "E-LOCANT", 2),
    ("(1-2R)", "E-LOCANT", 2),
    ("(SS)", "E-AMBIG", 2),
    ("(RRS)", "E-AMBIG", 2),
    ("(R/S)", "E-RS-SLASH", 2),
    ("(1R/2S)", "E-SLASH", 4),
    ("rac-(+)-(1R)", "E-STATUS", 0),
    ("meso-rac-(2R,3S)", "E-STATUS", 0),
    ("D-", "E-DL", 1),
    ("L-", "E-DL", 1),
    ("D-glucose", "E-DL", 1),
    ("(2R,S)", "E-MIXED-LOC", 0),
    ("(erythro)-", "E-UNSUPPORTED", 2),
    ("(threo)-(2R)", "E-UNSUPPORTED", 1),
    ("(1R.2S)", "E-UNKNOWN", 4),
    ("(R-)", "E-EMPTY", 4),
    ("(R 2)", "E-ORDER", 2),
    ("(1RR)", "E-UNKNOWN", 2),
    ("(1Rs,2S)", "E-UNKNOWN", 2),
    ("(1R,2 )", "E-NO-DESC", 5),
    ("(2EE)", "E-UNKNOWN", 2),
    ("((1R,2S)", "E-UNBALANCED", 1),
    ("(C R)", "E-UNKNOWN", 2),
    ("(1R,2S) and (1S,2R)", "E-SLASH", 9),
    ("(1R,2S)+(1S,2R)", "E-SLASH", 8),
    ("R or S", "E-RS-SLASH", 1),
    ("(5α,17β)", "E-UNSUPPORTED", 2),
    ("(OC-6-12)", "E-UNSUPPORTED", 2),
    ("(2Re)", "E-UNSUPPORTED", 2),
    ("(2'R,2'S)", "E-CONFLICT", 0),
    ("(1R:2S)", "E-UNKNOWN", 4),
    ("(R1,S2)", "E-ORDER", 2),
    ("(1R,2S)(1S)", "E-CONFLICT", 0),
];

pub(super) fn check_accepted(table: &[Accepted]) {
    let mut wrong = Vec::new();
    for (text, status, items, rotation, notes) in table {
        let got = match read(text) {
            Ok(line) => format!(
                "{} {:?} {:?} {:?}",
                line.status.name(),
                line.items.iter().map(Item::spelled).collect::<Vec<_>>(),
                line.rotation.map_or("", |r| r.sign()),
                line.notes.iter().map(Note::code).collect::<Vec<_>>()
            ),
            Err(error) => format!("{} at {}: {}", error.code, error.column, error.text),
        };
        let wanted = format!("{status} {items:?} {rotation:?} {notes:?}");
        if got != wanted {
            wrong.push(format!("{text}\n  wanted {wanted}\n  got    {got}"));
        }
    }
    assert!(
        wrong.is_empty(),
        "{} lines\n{}",
        wrong.len(),
        wrong.join("\n")
    );
}

pub(super) fn check_refused(table: &[Refused]) {
    let mut wrong = Vec::new();
    for (text, code, column) in table {
        match read(text) {
            Err(error) if error.code == *code && error.column == *column => {}
            other => wrong.push(format!(
                "{text}\n  wanted {code} at {column}\n  got    {other:?}"
            )),
        }
    }
    assert!(
        wrong.is_empty(),
        "{} lines\n{}",
        wrong.len(),
        wrong.join("\n")
    );
}

#[test]
fn accepted_lines_are_read_as_they_are_meant() {
    check_accepted(ACCEPTED);
}

#[test]
fn refused_lines_are_refused_at_their_place() {
    check_refused(REFUSED);
}
