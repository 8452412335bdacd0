//! `audit` and `mend` from outside: what they print, write and refuse.
#![allow(
    clippy::unwrap_used,
    clippy::expect_used,
    reason = "a test may fail by a panic, its helpers too"
)]

use serde_json::Value;
use std::fs;
use std::path::Path;
use std::process::Command;

/// Pentane-2,3-diol with marks on three bonds: from the first centre to its oxygen, between the centres, and
/// from the second centre to its oxygen.
fn diol(codes: [u8; 3]) -> String {
    let [first, between, second] = codes;
    format!(
        "N-17 batch 4
  test    01020304052D

  7  6  0  0  0  0  0  0  0  0999 V2000
    0.0000    0.0000    0.0000 C   0  0
    0.0000   -1.0000    0.0000 O   0  0
   -0.8700    0.5000    0.0000 C   0  0
    0.8700    0.5000    0.0000 C   0  0
    0.8700    1.5000    0.0000 O   0  0
    1.7300    0.0000    0.0000 C   0  0
    2.6000    0.5000    0.0000 C   0  0
  1  2  1  {first}
  1  3  1  0
  1  4  1  {between}
  4  5  1  {second}
  4  6  1  0
  6  7  1  0
M  END
"
    )
}

struct Answer {
    status: i32,
    out: String,
    err: String,
}

fn run(folder: &Path, words: &[&str]) -> Answer {
    let output = Command::new(env!("CARGO_BIN_EXE_wedgewright"))
        .args(words)
        .current_dir(folder)
        .output()
        .unwrap();
    Answer {
        status: output.status.code().expect("it ended by itself"),
        out: String::from_utf8(output.stdout).unwrap(),
        err: String::from_utf8(output.stderr).unwrap(),
    }
}

fn bench(records: &[(String, &str)]) -> tempfile::TempDir {
    let folder = tempfile::tempdir().unwrap();
    let text: String = records
        .iter()
        .map(|(mol, data)| format!("{mol}{data}$$$$\n"))
        .collect();
    fs::write(folder.path().join("a.sdf"), text).unwrap();
    folder
}

fn objects(text: &str) -> Vec<Value> {
    text.lines()
        .map(|l| serde_json::from_str(l).unwrap())
        .collect()
}

#[test]
fn audit_as_json() {
    let folder = bench(&[(diol([0, 6, 1]), ""), (diol([1, 0, 1]), "")]);
    let answer = run(folder.path(), &["audit", "a.sdf", "--json"]);
    // poor style alone is no fault
    assert_eq!(answer.status, 0, "{}", answer.err);
    let lines = objects(&answer.out);
    assert_eq!(lines.len(), 2);
    let finding = &lines[0]["findings"][0];
    assert_eq!(finding["kind"], "between-centres");
    assert_eq!(finding["grade"], "poor style");
    assert_eq!(finding["atoms"], serde_json::json!([1]));
    assert_eq!(finding["bonds"], serde_json::json!([3]));
    assert_eq!(finding["clause"], "ST-0.5");
    assert_eq!(finding["mends"][0]["keeps_meaning"], true);
    assert!(finding["text"].as_str().unwrap().contains("atom 4"));
    assert_eq!(lines[1]["findings"], serde_json::json!([]));
    assert!(lines[1]["error"].is_null());
}

#[test]
fn audit_tells_what_is_wrong_by_its_status() {
    let folder = bench(&[(diol([0, 0, 1]), "> <WANT>\n(1R,4S)\n\n")]);
    let open = run(folder.path(), &["audit", "a.sdf"]);
    assert_eq!(open.status, 0, "{}", open.err);
    assert!(
        open.out.contains("open\tundefined-centre\t1\t"),
        "{}",
        open.out
    );
    let asked = run(folder.path(), &["audit", "a.sdf", "--carry-field", "WANT"]);
    assert_eq!(asked.status, 1);
    assert!(
        asked.out.contains("wrong\tundefined-centre\t1\t"),
        "{}",
        asked.out
    );
    let field = run(folder.path(), &["audit", "a.sdf", "--carry-field", "OTHER"]);
    assert_eq!(field.status, 2);
    assert!(field.err.contains("no record has a data field 'OTHER'"));
    let line = run(folder.path(), &["audit", "a.sdf", "--carry", "(1Q)"]);
    assert_eq!(line.status, 2, "{}", line.err);
}

#[test]
fn mend_keeps_the_meaning_and_logs_it() {
    let folder = bench(&[(diol([0, 6, 1]), "> <ID>\n7\n\n"), (diol([1, 0, 1]), "")]);
    let at = folder.path();
    let labels = |name: &str| run(at, &["labels", name]).out;
    let answer = run(at, &["mend", "a.sdf", "-o", "b.sdf", "--log", "log.ndjson"]);
    assert_eq!(answer.status, 0, "{}", answer.err);
    assert_eq!(labels("a.sdf"), labels("b.sdf"));
    let text = fs::read_to_string(at.join("b.sdf")).unwrap();
    assert!(text.contains("> <ID>\n7\n"), "{text}");
    assert_eq!(text.matches("<VERDICT>").count(), 2);
    // the second record needed nothing and is as it was
    assert!(text.contains(&diol([1, 0, 1])), "{text}");
    let log = objects(&fs::read_to_string(at.join("log.ndjson")).unwrap());
    assert_eq!(log.len(), 1);
    assert_eq!(log[0]["record"], 1);
    assert_eq!(log[0]["reason"]["kind"], "between-centres");
    assert_eq!(log[0]["keeps_meaning"], true);
    let marks = |key: &str| log[0][key].as_array().unwrap().len();
    assert_eq!((marks("before"), marks("after")), (2, 2));
    let left = run(at, &["audit", "b.sdf"]);
    assert_eq!(left.out, "");
}

#[test]
fn mend_meets_a_requirement_or_says_why_not() {
    let folder = bench(&[
        (diol([0, 0, 0]), "> <WANT>\n(1R,4S)\n\n"),
        (diol([1, 0, 1]), "> <WANT>\n(3R)\n\n"),
    ]);
    let at = folder.path();
    let answer = run(
        at,
        &["mend", "a.sdf", "--carry-field", "WANT", "-o", "b.sdf"],
    );
    assert_eq!(answer.status, 1);
    assert!(answer.err.contains("record 2: cannot"), "{}", answer.err);
    let labels = run(at, &["labels", "b.sdf"]).out;
    assert!(labels.starts_with("1\tN-17 batch 4\t1R 4S\n"), "{labels}");
    let text = fs::read_to_string(at.join("b.sdf")).unwrap();
    assert!(text.contains("<REASON>") && text.contains(&diol([1, 0, 1])));
    let same = run(at, &["mend", "a.sdf", "-o", "b.sdf", "--log", "b.sdf"]);
    assert_eq!(same.status, 2, "{}", same.err);
}
