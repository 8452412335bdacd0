//! `labels` on files of line notation, from outside.
#![allow(
    clippy::unwrap_used,
    clippy::expect_used,
    reason = "a test may fail by a panic, its helpers too"
)]

use std::fs;
use std::process::{Command, Output};
use tempfile::TempDir;

/// Amino acids by IUPAC-IUB 1983: L-threonine (2S,3R), L-cysteine (2R).
const LINES: &str = "#SMILES\tname
C[C@@H](O)[C@H](N)C(=O)O\tN-17\tbatch 4

N[C@@H](CS)C(=O)O |a:1| HQ-2
F/C=C/C
";

fn run(folder: &TempDir, words: &[&str]) -> Output {
    Command::new(env!("CARGO_BIN_EXE_wedgewright"))
        .args(words)
        .current_dir(folder.path())
        .env_remove("DISPLAY")
        .env_remove("WAYLAND_DISPLAY")
        .output()
        .unwrap()
}

fn put(name: &str, content: &str) -> TempDir {
    let folder = tempfile::tempdir().unwrap();
    fs::write(folder.path().join(name), content).unwrap();
    folder
}

fn said(bytes: &[u8]) -> String {
    String::from_utf8(bytes.to_vec()).unwrap()
}

#[test]
fn a_line_is_a_record_whatever_the_file_is_called() {
    for name in ["a.smi", "a.mol", "a"] {
        let output = run(&put(name, LINES), &["labels", name]);
        assert_eq!(output.status.code(), Some(0), "{}", said(&output.stderr));
        assert_eq!(
            said(&output.stdout),
            "1\tN-17 batch 4\t2R 4S\n2\tHQ-2\t2R\n3\t\t2E 3E\n"
        );
    }
}

#[test]
fn places_as_json() {
    let output = run(&put("a.smi", LINES), &["labels", "a.smi", "--json"]);
    let text = said(&output.stdout);
    let rows: Vec<serde_json::Value> = text
        .lines()
        .map(|row| serde_json::from_str(row).unwrap())
        .collect();
    assert_eq!(rows.len(), 3);
    assert_eq!(rows[1]["title"], "HQ-2");
    let unit = &rows[1]["units"][0];
    assert_eq!(
        (&unit["carries"], &unit["rule"]),
        (&"R".into(), &"1a".into())
    );
    assert_eq!(unit["ranking"], serde_json::json!([1, 3, 5, "H"]));
    assert_eq!(rows[2]["units"][0]["kind"], "double-bond");
}

#[test]
fn a_bad_line_keeps_the_others_and_says_where() {
    let lines = "CO ok\nC/C(\\F)=C/F\tnot so\nN[C@?H](C)F old\nC[C@](C)C idle\n";
    let folder = put("a.smi", lines);
    let output = run(&folder, &["labels", "a.smi"]);
    assert_eq!(output.status.code(), Some(1));
    assert_eq!(said(&output.stdout), "1\tok\t\n4\tidle\t\n");
    let told = said(&output.stderr);
    for words in [
        "record 2, line 2, column 5: / and \\ put both ligands",
        "record 3, line 3, column 4: @? is no sign of the notation. Write no @ for an unknown centre.",
        "record 4, line 4: the @ at atom 2 (column 2) says nothing",
    ] {
        assert!(told.contains(words), "'{words}' is not in: {told}");
    }
    let json = said(&run(&folder, &["labels", "a.smi", "--json"]).stdout);
    let second: serde_json::Value = serde_json::from_str(json.lines().nth(1).unwrap()).unwrap();
    assert_eq!(second["title"], "not so");
    assert_eq!(second["error"]["columns"], serde_json::json!([5, 5]));
}

#[test]
fn other_verbs_and_other_text_refuse_it() {
    let folder = put("a.smi", LINES);
    let figure = run(&folder, &["figure", "a.smi", "-o", "a.svg"]);
    assert_eq!(figure.status.code(), Some(2));
    let folder = put("a.txt", "once upon a time\nthere was a list\n");
    let output = run(&folder, &["labels", "a.txt"]);
    assert_eq!(output.status.code(), Some(2));
    assert!(said(&output.stderr).contains("no molfile"));
}
