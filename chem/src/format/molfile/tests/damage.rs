//! The table of damage that real files show: repaired with a notice, or refused with its place.

use super::*;

/// Rows of damage that are repaired: what is changed, and the notice it leaves.
#[test]
fn repairs_leave_a_notice() {
    let plain = written(&good(&alanine()));
    let cases: [(&str, String, &str); 9] = [
        ("no end", alanine().replace("M  END\n", ""), "no-end-line"),
        (
            "short end",
            alanine().replace("M  END", "M END"),
            "end-line",
        ),
        (
            "no name line",
            alanine().replace("N-17 batch 4\n", ""),
            "header",
        ),
        (
            "extra line",
            alanine().replace("comment\n", "comment\nmore\n"),
            "header",
        ),
        (
            "tabs",
            alanine().replace(
                "    1.2990    0.7500    0.0000 C  ",
                "\t1.299\t0.75\t0\tC\t",
            ),
            "columns",
        ),
        (
            "loose atoms",
            alanine().replace("    1.2990    0.7500    0.0000 C  ", "1.299 0.75 0 C"),
            "columns",
        ),
        (
            "loose bonds",
            alanine().replace("  2  3  1  1\n", "2 3 1 1\n"),
            "columns",
        ),
        (
            "loose counts",
            alanine().replace("  6  5  0", "6 5 0"),
            "columns",
        ),
        (
            "wedge on double",
            alanine().replace("  4  5  2  0", "  4  5  2  1"),
            "mark-on-multiple-bond",
        ),
    ];
    for (name, text, code) in cases {
        let record = good(&text);
        assert_eq!(codes(&record), [code], "{name}");
        let body = |t: &str| t.lines().skip(3).collect::<Vec<_>>().join("\n");
        assert_eq!(body(&written(&record)), body(&plain), "{name}");
    }
}

fn changed(from: &str, to: &str) -> String {
    assert!(alanine().contains(from));
    alanine().replace(from, to)
}

/// Where a text is refused, and why.
fn refused(text: &str, line: usize, columns: Option<(usize, usize)>, reason: &Reason) {
    let error = bad(text);
    assert_eq!(
        (error.line, error.columns, &error.reason),
        (line, columns, reason),
        "{text}"
    );
}

#[test]
fn wrong_counts_tell_both_numbers() {
    let atom = "    1.2990    0.7500    0.0000 C   0  0  0  0  0\n";
    for (text, said, found) in [
        (changed("  6  5  0", "  7  5  0"), (7, 5), (6, 5)),
        (changed("  6  5  0", "  5  5  0"), (5, 5), (6, 5)),
        (changed("  6  5  0", "  6  6  0"), (6, 6), (6, 5)),
        (changed("  6  5  0", "  6  4  0"), (6, 4), (6, 5)),
        (changed(atom, ""), (6, 5), (5, 5)),
    ] {
        refused(&text, 4, Some((1, 6)), &Reason::Counts { said, found });
    }
    let shown = bad(&changed("  6  5  0", "  6  4  0")).to_string();
    assert!(shown.contains("6 atoms and 4 bonds") && shown.contains("write   6  5 at the start"));
    let reason = Reason::NeedsV3000;
    refused(
        &changed("  6  5  0  0", "10001001  0  0"),
        4,
        Some((1, 8)),
        &reason,
    );
    assert_eq!(bad("a\nb\n\nno counts\n").reason, Reason::NoCountsLine);
    refused(&changed("V2000", "V3000"), 4, None, &Reason::NotV3000);
}

#[test]
fn bad_bonds_are_refused_at_their_columns() {
    let missing = |number| Reason::NoSuchAtom { number, atoms: 6 };
    let last = |to: &str| changed("  4  6  1", to);
    let twice = Reason::Twice {
        atoms: (1, 2),
        first: 11,
    };
    refused(&last("  4 16  1"), 15, Some((4, 6)), &missing(16));
    refused(&last("  0  6  1"), 15, Some((1, 3)), &missing(0));
    refused(&last("  4  4  1"), 15, Some((1, 6)), &Reason::Loop(4));
    refused(&last("  2  1  1"), 15, Some((1, 6)), &twice);
    assert!(matches!(
        bad(&last("  4  6 11")).reason,
        Reason::OutOfRange { .. }
    ));
}

#[test]
fn bad_numbers_are_refused_at_their_columns() {
    let reason = Reason::Number {
        field: "the y of the atom",
        text: "o.7500".into(),
    };
    let text = changed("    1.2990    0.7500", "    1.2990    o.7500");
    refused(&text, 6, Some((15, 20)), &reason);
    let huge = changed("    2.5980   -1.5000", "    1e9999   -1.5000");
    assert!(matches!(bad(&huge).reason, Reason::Number { .. }));
}

#[test]
fn places_that_say_nothing_are_noticed() {
    let pair = |x, y| {
        mol(
            &[("C", 0.0, 0.0), ("C", x, y), ("C", 1.5, 0.0)],
            &["  1  2  1", "  2  3  1"],
            "",
        )
    };
    assert_eq!(
        codes(&good(&mol(
            &[("C", 0.0, 0.0), ("O", 0.0, 0.0)],
            &["  1  2  1"],
            ""
        ))),
        ["no-coordinates"]
    );
    assert_eq!(
        codes(&good(&pair(0.0, 0.0))),
        ["same-place", "uneven-lengths"]
    );
    assert_eq!(codes(&good(&pair(0.7, 0.7))), [""; 0]);
    let model = good(&alanine().replace(
        "    1.2990    0.7500    0.0000",
        "    1.2990    0.7500    0.5000",
    ));
    assert_eq!(codes(&model), ["in-space"]);
    assert_eq!(model.drawing.depths().map(|d| d[1]), Some(0.5));
    assert!(written(&model).contains("    1.2990    0.7500    0.5000 C"));
    let five = mol(
        &[
            ("C", 0.0, 0.0),
            ("C", 1.0, 0.0),
            ("C", -1.0, 0.0),
            ("O", 0.0, 1.0),
            ("O", 0.0, -1.0),
        ],
        &["  1  2  1", "  1  3  1", "  1  4  2", "  1  5  1"],
        "",
    );
    assert_eq!(codes(&good(&five)), ["valence"]);
}
