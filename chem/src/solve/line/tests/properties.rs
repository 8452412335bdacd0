//! What holds of any line.

use crate::solve::line::{Item, read};
use proptest::prelude::*;

/// Pieces of which lines are made, well-formed and not.
#[rustfmt::skip]
const PIECES: &[&str] = &[
    "(", ")", "[", "]", "{", "}", ",", ";", " ", "-", ":", "=", "/", "+", "±", "?", "*", "_", "'",
    "^", ".", "1", "2", "3a", "10", "0", "N", "C", "P", "Si", "α", "β", "R", "S", "r", "s", "E",
    "Z", "e", "z", "M", "m", "p", "a", "Ξ", "xi", "cis", "trans", "seqCis", "all", "rac", "rel",
    "meso", "abs", "or", "and", "D", "Re", "threo", "OC-6", "but-2-ene", "(1R,2S)", "(+)",
    "(1(10)E", "1,2-", "R*", "RS", "<i>", "<sup>", "</sup>", "<sub>", "¹", "ₐ", "″", "Е",
    "\u{200b}", "½", "é",
];

/// Pieces in any order.
fn pieces() -> impl Strategy<Value = String> {
    let piece = prop::sample::select(PIECES);
    prop::collection::vec(piece, 0..24).prop_map(|pieces| pieces.concat())
}

fn locant() -> impl Strategy<Value = String> {
    let primes = "'{0,2}";
    prop_oneof![
        6 => (1u32..40, primes).prop_map(|(n, p)| format!("{n}{p}")),
        2 => (1u32..20, "[a-z]\\^?[1-9]?", primes).prop_map(|(n, l, p)| format!("{n}{}{p}", l.trim_end_matches('^'))),
        1 => (1u32..9, 1u32..9, "[a-z]?").prop_map(|(n, s, l)| format!("{n}^{s}{l}")),
        1 => (1u32..20, 1u32..20, "[a-z]?", primes).prop_map(|(n, m, l, p)| format!("{n}({m}{l}{p})")),
        1 => ("(N|O|P|As|Si|Ge|Se|Te|B)[1-9]?", primes).prop_map(|(s, p)| format!("{s}{p}")),
        1 => ("[α-ν]", primes).prop_map(|(s, p)| format!("{s}{p}")),
    ]
}

/// Lines of which most are well-formed.
fn lines() -> impl Strategy<Value = String> {
    let value = prop::sample::select(vec![
        "R", "S", "r", "s", "E", "Z", "e", "z", "M", "P", "m", "p", "Ra", "aS", "Rp", "pS", "R*",
        "S*", "RS", "SR", "seqCis", "seqTrans", "cis", "trans", "Ξ", "EZ", "E/Z", "R_P", "S_S",
        "r_C",
    ]);
    let joiner = prop::sample::select(vec!["", "", "", "-", ":", "="]);
    let located = (locant(), joiner, value.clone()).prop_map(|(l, j, v)| format!("{l}{j}{v}"));
    let pair = (locant(), locant(), "cis|trans").prop_map(|(a, b, v)| format!("{a},{b}-{v}"));
    let all = value.clone().prop_map(|v| format!("all-{v}"));
    let item = prop_oneof![12 => located, 1 => pair, 1 => all];
    let list = prop_oneof![
        8 => prop::collection::vec(item, 1..6).prop_map(|items| items.join(",")),
        1 => prop::collection::vec(value.prop_map(str::to_owned), 1..3).prop_map(|items| items.join(",")),
    ];
    let front = prop::sample::select(vec![
        "", "", "", "rac-", "rel-", "meso-", "abs-", "(+)-", "(-)-", "(±)-", "(+)-rel-", "(rac)-",
    ]);
    let tail = prop::sample::select(vec!["", "", "-", "-but-2-ene", "-(+)"]);
    (front, list, tail).prop_map(|(front, list, tail)| format!("{front}({list}){tail}"))
}

fn spelled(items: &[Item]) -> Vec<String> {
    let mut spelled: Vec<_> = items.iter().map(Item::spelled).collect();
    spelled.sort();
    spelled
}

/// What holds of a line, read or not.
fn holds(text: &str) -> Result<bool, TestCaseError> {
    let count = text.chars().count();
    match read(text) {
        Err(error) => {
            prop_assert!(error.column <= count + 1, "{text:?}: {error:?}");
            prop_assert!(error.code.starts_with("E-") && !error.text.is_empty());
            Ok(false)
        }
        Ok(line) => {
            for item in &line.items {
                prop_assert!(item.columns.start >= 1 && item.columns.start < item.columns.end);
                prop_assert!(item.columns.end <= count + 1, "{text:?}");
            }
            let printed = line.to_string();
            let again = match read(&printed) {
                Ok(again) => again,
                Err(error) => {
                    return Err(TestCaseError::fail(format!(
                        "{text:?} as {printed}: {error}"
                    )));
                }
            };
            prop_assert_eq!(again.status, line.status, "{:?} as {}", text, &printed);
            prop_assert_eq!(
                spelled(&again.items),
                spelled(&line.items),
                "{:?} as {}",
                text,
                &printed
            );
            prop_assert_eq!(again.to_string(), printed, "{:?}", text);
            Ok(true)
        }
    }
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 2_000, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn any_text_is_read_or_refused(text in any::<String>()) {
        holds(&text)?;
    }

    #[test]
    fn pieces_in_any_order_are_read_or_refused(text in pieces()) {
        holds(&text)?;
    }

    #[test]
    fn the_printed_form_reads_as_the_line_itself(text in lines()) {
        holds(&text)?;
    }
}

/// The generator above would prove nothing if its lines were refused.
#[test]
fn most_lines_made_are_read() {
    use proptest::strategy::ValueTree;
    let mut runner = proptest::test_runner::TestRunner::deterministic();
    let read = (0..400)
        .filter_map(|_| lines().new_tree(&mut runner).ok())
        .filter(|tree| holds(&tree.current()).unwrap_or(false))
        .count();
    assert!(read > 150, "{read}");
}
