//! Forms beside those of the tables, columns, limits and what the types say of themselves.

use super::tables::{Accepted, Refused, check_accepted, check_refused};
use crate::solve::line::{Line, Locant, Note, Place, Value, read};
use crate::stereo::Descriptor;

fn line(text: &str) -> Line {
    match read(text) {
        Ok(line) => line,
        Err(error) => panic!("{text}: {error}"),
    }
}

/// Own rules where no source is named.
#[rustfmt::skip]
const ACCEPTED: &[Accepted] = &[
    // a name behind a hyphen, told from further groups
    ("(R)-S-methylcysteine", "abs", &[":R"], "", &["I-NAME-TAIL"]),
    ("(R)-(1-phenylethyl)amine", "abs", &[":R"], "", &["I-NAME-TAIL"]),
    ("(1R)-[1,1'-biphenyl]-2-ol", "abs", &["1:R"], "", &["I-NAME-TAIL"]),
    ("(R)-3", "abs", &[":R"], "", &["I-NAME-TAIL"]),
    ("(1R)-2S-menthol", "abs", &["1:R", "2:S"], "", &["I-BARE", "I-NAME-TAIL"]),
    ("1R-2S", "abs", &["1:R", "2:S"], "", &["I-BARE", "I-SEP"]),
    ("rac-2-p-tolylpropane", "rac", &[], "", &["I-NAME-TAIL", "W-NO-ITEMS"]),
    ("rac-E-stilbene", "rac", &[":E"], "", &["I-BARE", "I-NAME-TAIL"]),
    ("(2R,3R)-D-threose", "abs", &["2:R", "3:R"], "", &["I-NAME-TAIL", "W-DL"]),
    ("(2R)-2-[(2E)-but-2-en-1-yl]oxane", "abs", &["2:R"], "", &["I-NAME-TAIL", "W-INNER"]),
    // status and rotation in any order
    ("(1R,2S)-rel-", "rel", &["1:R", "2:S"], "", &[]),
    ("(2R,3S)-meso-tartaric acid", "meso", &["2:R", "3:S"], "", &["I-NAME-TAIL"]),
    ("(1R,2S)-(+)-menthol", "abs", &["1:R", "2:S"], "+", &["I-NAME-TAIL"]),
    ("(+)-rel-(1R,2S)", "rel", &["1:R", "2:S"], "+", &[]),
    ("Rac. (1R)", "rac", &["1:R"], "", &[]),
    ("rel 1R,2S", "rel", &["1:R", "2:S"], "", &["I-BARE"]),
    ("1R,2S rel", "rel", &["1:R", "2:S"], "", &["I-BARE"]),
    ("rac-(1RS,2SR)", "rac", &["1:RS", "2:SR"], "", &["I-REDUNDANT"]),
    ("(±)-(1R*,2S*)", "rac", &["1:R*", "2:S*"], "±", &["I-REDUNDANT"]),
    ("(1R*,2S*,4E)", "rel", &["1:R*", "2:S*", "4:E"], "", &[]),
    ("(1R*,2S)", "rel", &["1:R*", "2:S"], "", &["W-PARTIAL"]),
    ("(2RS,3R)-(+)", "rac", &["2:RS", "3:R"], "+", &["W-PARTIAL"]),
    // all
    ("(all-E)-retinol", "abs", &["*:E"], "", &["I-NAME-TAIL"]),
    ("all-trans-retinol", "abs", &["*:trans"], "", &["I-NAME-TAIL", "W-CISTRANS"]),
    ("allR", "abs", &["*:R"], "", &["I-BARE"]),
    ("(all-E,9E,3R)", "abs", &["*:E", "9:E", "3:R"], "", &[]),
    // locants: 4'a stands beside 4a in IUPAC 2013 recommendations P-31.1.2 (from memory)
    ("(3'aR)", "abs", &["3a':R"], "", &[]),
    ("(3a¹R)", "abs", &["3a1:R"], "", &[]),
    ("(1^2R,4(4a)E)", "abs", &["1^2:R", "4(4a):E"], "", &[]),
    ("(1r^4R)", "abs", &["1r4:R"], "", &[]),
    ("(N²R)", "abs", &["N2:R"], "", &[]),
    ("(P1R,PS)", "abs", &["P1:R", "P:S"], "", &[]),
    ("(NEZ,α?)", "abs", &["N:Xi", "α:Xi"], "", &["W-MIXED-EZ", "W-XI"]),
    ("(γ'E)", "abs", &["γ':E"], "", &[]),
    ("(1R2'S)", "abs", &["1:R", "2':S"], "", &["I-NOCOMMA"]),
    ("(2-cis,1,4-trans)", "abs", &["2:cis", "1,4:trans"], "", &["W-CISTRANS"]),
    ("(2,1-cis)", "abs", &["1,2:cis"], "", &["W-CISTRANS"]),
    ("cis-1,2,4-trimethylcyclohexane", "abs", &[":cis"], "", &["I-NAME-TAIL", "W-CISTRANS"]),
    // descriptors
    ("(1:aR)", "abs", &["1:Ra"], "", &["I-SEP"]),
    ("(3Sp)", "abs", &["3:Sp"], "", &["W-RP"]),
    ("(1R_P,2S)", "abs", &["1:R", "2:S"], "", &["I-ATOM-SUFFIX"]),
    ("(2EZ,4Z/E)", "abs", &["2:Xi", "4:Xi"], "", &["W-MIXED-EZ", "W-XI"]),
    ("E or Z", "abs", &[":Xi"], "", &["I-BARE", "W-MIXED-EZ", "W-XI"]),
    ("(2seqtrans)", "abs", &["2:seqTrans"], "", &[]),
    // typography
    ("1<sup>2</sup>R", "abs", &["1^2:R"], "", &["I-BARE"]),
    ("(R<sub>S</sub>)", "abs", &["S:R"], "", &["I-ATOM-SUFFIX"]),
    ("(Rₐ)", "abs", &[":Ra"], "", &[]),
    ("<span class=\"x\">(2″<I>R</I>)</span>", "abs", &["2'':R"], "", &[]),
    ("( 1R\u{a0}, 2S )", "abs", &["1:R", "2:S"], "", &[]),
    ("{1R}–[2S]", "abs", &["1:R", "2:S"], "", &["I-BRACKET"]),
];

#[rustfmt::skip]
const REFUSED: &[Refused] = &[
    ("", "E-EMPTY", 0),
    ("  ", "E-EMPTY", 0),
    ("1R,", "E-EMPTY", 4),
    ("(1R;;2S)", "E-EMPTY", 5),
    ("(1R:)", "E-EMPTY", 5),
    ("[1R", "E-UNBALANCED", 1),
    ("(2R)-2-(methyl", "E-UNBALANCED", 8),
    ("butan-2-ol", "E-NO-STEREO", 0),
    ("2,3-dihydroxybutanedioic acid", "E-NO-STEREO", 0),
    ("1-(propan-2-yl)benzene", "E-NO-STEREO", 0),
    ("mesoo-(1R)", "E-UNKNOWN", 1),
    ("(1R,2S) menthol", "E-UNKNOWN", 9),
    ("(rac-1R)", "E-UNKNOWN", 2),
    ("(1R),(2S)", "E-UNKNOWN", 5),
    ("(1R-2S)", "E-UNKNOWN", 4),
    ("((1R)(2S))", "E-UNKNOWN", 2),
    ("(1R'2S)", "E-UNKNOWN", 4),
    ("(1R)-(2X)", "E-UNKNOWN", 7),
    ("(NM)", "E-UNKNOWN", 2),
    ("(0R)", "E-LOCANT", 2),
    ("(01R)", "E-LOCANT", 2),
    ("(4294967296R)", "E-LOCANT", 2),
    ("(3a12R)", "E-LOCANT", 2),
    ("(1^0R)", "E-LOCANT", 2),
    ("(1(10E))", "E-LOCANT", 2),
    ("2(R)", "E-LOCANT", 1),
    ("(3a)", "E-NO-DESC", 2),
    ("(N2)", "E-NO-DESC", 2),
    ("(R,2)", "E-NO-DESC", 4),
    ("(all)", "E-NO-DESC", 2),
    ("(1,2-R)", "E-NO-DESC", 2),
    ("(1r4r)", "E-AMBIG", 2),
    ("(1e2Z)", "E-AMBIG", 2),
    ("(ZE)", "E-AMBIG", 2),
    ("p-cymene", "E-AMBIG", 1),
    ("2-p-tolylpropane", "E-AMBIG", 1),
    ("rac-SS", "E-AMBIG", 5),
    ("R-2", "E-ORDER", 1),
    ("(R2S)", "E-ORDER", 2),
    ("(1R or S)", "E-RS-SLASH", 2),
    ("(M/P)", "E-RS-SLASH", 2),
    ("(1R/1S)", "E-SLASH", 4),
    ("(1R and 2S)", "E-SLASH", 5),
    ("(R)/(S)", "E-SLASH", 4),
    ("(all-E,9Z)", "E-CONFLICT", 0),
    ("(1,2-cis,2,1-trans)", "E-CONFLICT", 0),
    ("(R)-(2E)", "E-MIXED-LOC", 0),
    ("rel-(1RS)", "E-STATUS", 0),
    ("(1RS,2R*)", "E-STATUS", 0),
    ("abs-(1R*)", "E-STATUS", 0),
    ("meso-(+)", "E-STATUS", 0),
    ("rel-(±)", "E-STATUS", 0),
    ("(+)-(1R)-(-)", "E-ROT-TWICE", 10),
    ("D,L-alanine", "E-DL", 1),
    ("(2D)", "E-DL", 2),
    ("(2R)-(threo)", "E-UNSUPPORTED", 7),
    ("(2-endo,3-exo)", "E-UNSUPPORTED", 2),
    ("(1r,2c)", "E-UNSUPPORTED", 5),
    ("s-cis-butadiene", "E-UNSUPPORTED", 1),
    ("rac-threo-x", "E-UNSUPPORTED", 5),
    ("α-D-glucopyranose", "E-UNSUPPORTED", 1),
    ("(2Е)-but-2-ene", "E-LOOKALIKE", 3),
    ("(1R,2\u{0405})", "E-LOOKALIKE", 6),
    ("(Ρ)", "E-LOOKALIKE", 2),
    ("(1R,\t2S)", "E-CONTROL", 5),
    ("(1\u{200b}R)", "E-CONTROL", 3),
    // columns are those of the line as typed
    ("(1<em>R</em>,2<em>X</em>)", "E-UNKNOWN", 14),
    ("(+/-)-(1R,2X)", "E-UNKNOWN", 11),
    ("(1″R,2)", "E-NO-DESC", 6),
];

#[test]
fn further_forms_are_read() {
    check_accepted(ACCEPTED);
}

#[test]
fn further_lines_are_refused_at_their_place() {
    check_refused(REFUSED);
}

#[test]
fn items_point_at_the_line_as_typed() {
    let columns =
        |text: &str| -> Vec<_> { line(text).items.into_iter().map(|i| i.columns).collect() };
    assert_eq!(columns("(1R,2'S)"), [2..4, 5..8]);
    assert_eq!(columns("(1<em>R</em>,2<em>S</em>)"), [2..8, 14..20]);
    assert_eq!(columns("(+/-)-(1R,3S)"), [8..10, 11..13]);
    assert_eq!(columns("cis-1,2 trans-3,4-x"), [1..8, 9..18]);
}

/// IUPAC 1993 guide for the form; IUPAC 2013 recommendations P-14.3.5 for primes.
#[test]
fn one_form_is_printed() {
    for (typed, printed) in [
        ("[ 3'S; 12R 3R ]", "(3R,3'S,12R)"),
        ("(2R,1S,αR,NE)", "(NE,αR,1S,2R)"),
        (
            "(3a1S,3a'R,3aR,3'S,3S,1^2R,1S)",
            "(1S,1^2R,3S,3'S,3aR,3a'R,3a1S)",
        ),
        ("(±)-1R,2S-menthol", "rac-(1R,2S)"),
        ("(1RS,2SR)", "(1RS,2SR)"),
        ("rel-(1R*)", "(1R*)"),
        ("(1R)-(-)-rel-", "(-)-rel-(1R)"),
        ("racemic", "rac"),
        ("abs", "abs"),
        ("(+)", "(+)"),
        ("(2R,1?)", "(1Ξ,2R)"),
        ("(S_S)", "(S_S)"),
        ("(R_P)", "(PR)"),
        ("trans-2,1", "(1,2-trans)"),
        ("allE", "(all-E)"),
        ("(1r^4R)", "(1r^4R)"),
        ("(5pR)", "(5pR)"),
    ] {
        assert_eq!(line(typed).to_string(), printed, "{typed}");
    }
}

#[test]
fn only_plain_numbers_are_numbers() {
    let number = |text: &str| {
        line(text)
            .items
            .first()
            .and_then(|i| i.locant)
            .and_then(|l| l.number())
    };
    assert_eq!(number("(12R)"), Some(12));
    for text in [
        "(3aR)",
        "(3'R)",
        "(1^2R)",
        "(1(10)E)",
        "(NR)",
        "(αR)",
        "(1,2-cis)",
        "(all-R)",
        "(R)",
    ] {
        assert_eq!(number(text), None, "{text}");
    }
}

/// The lists of IUPAC 2013 recommendations P-91.2.1.1.
#[test]
fn values_stand_for_descriptors() {
    assert_eq!(Value::AxialR.descriptor(), Some(Descriptor::M));
    assert_eq!(Value::AxialS.descriptor(), Some(Descriptor::P));
    assert_eq!(Value::PlanarR.descriptor(), Some(Descriptor::P));
    assert_eq!(Value::PlanarS.descriptor(), Some(Descriptor::M));
    assert_eq!(Value::SeqCis.descriptor(), Some(Descriptor::LowerZ));
    assert_eq!(Value::SeqTrans.descriptor(), Some(Descriptor::LowerE));
    for value in [Value::RelativeR, Value::RacemicSr, Value::Cis, Value::Xi] {
        assert_eq!(value.descriptor(), None);
    }
    assert_eq!(Value::RelativeR.drawn(), Some(Descriptor::R));
    assert_eq!(Value::RacemicSr.drawn(), Some(Descriptor::S));
}

#[test]
fn every_value_is_read_as_it_is_spelled() {
    for value in Value::ALL {
        let got = line(&format!("(4{value})"));
        let wanted: Vec<(Option<usize>, Value)> = vec![(Some(4), value)];
        let found: Vec<_> = got
            .items
            .iter()
            .map(|i| (i.locant.and_then(|l| l.number()), i.value))
            .collect();
        assert_eq!(found, wanted);
    }
}

#[test]
fn inner_descriptors_are_listed() {
    let notes = line("(2R)-2-[(2E)-but-2-en-1-yl]-5-{[(1R,2S)-x]}oxane").notes;
    let inner = Note::Inner(vec!["(2E)".to_owned(), "(1R,2S)".to_owned()]);
    assert!(notes.contains(&inner), "{notes:?}");
    assert!(inner.text().contains("(2E) (1R,2S)"));
    assert!(inner.is_warning() && !Note::NameTail.is_warning());
}

#[test]
fn a_mistyped_word_brings_the_nearest_one() {
    for (text, near) in [
        ("racemate", "racemic"),
        ("(2seqsis)", "seqCis"),
        ("tranz", "trans"),
    ] {
        let error = read(text).unwrap_err();
        assert_eq!(error.code, "E-UNKNOWN", "{text}");
        assert!(error.text.contains(near), "{}", error.text);
    }
}

#[test]
fn lines_are_limited() {
    let items = |count: usize| (1..=count).map(|n| format!("{n}R")).collect::<Vec<_>>();
    // 500 distinct locants do not fit into a line with commas, so the same few are repeated
    let many = |count: usize| {
        items(9)
            .into_iter()
            .cycle()
            .take(count)
            .collect::<Vec<_>>()
            .join(",")
    };
    assert_eq!(line(&many(500)).items.len(), 9);
    let error = read(&many(501)).unwrap_err();
    assert_eq!((error.code, error.column), ("E-LIMIT", 1501));
    let name = |count: usize| format!("(1R)-{}", "a".repeat(count - 5));
    assert!(read(&name(2_000)).is_ok());
    assert_eq!(read(&name(2_001)).unwrap_err().code, "E-LIMIT");
    assert_eq!(read(&"\u{fdfa}".repeat(1_900)).unwrap_err().code, "E-LIMIT");
}

#[test]
fn deep_brackets_are_read() {
    let deep = format!("{}1R{}", "(".repeat(900), ")".repeat(900));
    assert_eq!(line(&deep).to_string(), "(1R)");
    let inside = format!("(1R)-{}oxane{}", "[".repeat(900), "]".repeat(900));
    assert_eq!(line(&inside).notes, [Note::NameTail]);
}

#[test]
fn two_places_have_one_order() {
    let place = |text: &str| {
        line(text)
            .items
            .first()
            .and_then(|i| i.locant)
            .map(|l| l.first)
    };
    let (Some(a), Some(b)) = (place("(1R)"), place("(2R)")) else {
        panic!("no locants");
    };
    assert_eq!(Locant::pair(a, b), Locant::pair(b, a));
    assert!(Place::All < a && a < b);
}
