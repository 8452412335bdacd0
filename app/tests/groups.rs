//! Records of version 3000 through the command line: what they claim is kept.

use std::fs;
use std::process::Command;

const MOLFILE: &str = "\
aminobutanol

  test
  0  0  0     0  0            999 V3000
M  V30 BEGIN CTAB
M  V30 COUNTS 6 5 1 0 0
M  V30 BEGIN ATOM
M  V30 1 C 0 0 0 0
M  V30 2 C 1.3 0.75 0 0
M  V30 3 C 2.6 0 0 0
M  V30 4 C 3.9 0.75 0 0
M  V30 5 N 1.3 2.25 0 0
M  V30 6 O 2.6 -1.5 0 0
M  V30 END ATOM
M  V30 BEGIN BOND
M  V30 1 1 1 2
M  V30 2 1 2 3
M  V30 3 1 3 4
M  V30 4 1 2 5 CFG=1
M  V30 5 1 3 6 CFG=1
M  V30 END BOND
M  V30 BEGIN SGROUP
M  V30 1 DAT 0 ATOMS=(1 5) FIELDNAME=batch FIELDDATA=7
M  V30 END SGROUP
M  V30 BEGIN COLLECTION
M  V30 MDLV30/STERAC1 ATOMS=(2 2 3)
M  V30 END COLLECTION
M  V30 END CTAB
M  END
";

#[test]
fn marks_are_placed_and_stereo_groups_stay() {
    let folder = tempfile::tempdir().unwrap();
    let run = |words: &[&str]| {
        let output = Command::new(env!("CARGO_BIN_EXE_wedgewright"))
            .args(words)
            .current_dir(folder.path())
            .output()
            .unwrap();
        let text = |bytes| String::from_utf8(bytes).unwrap();
        (
            output.status.code(),
            text(output.stdout),
            text(output.stderr),
        )
    };
    fs::write(
        folder.path().join("a.sdf"),
        format!("{MOLFILE}> <A>\n1\n\n$$$$\n"),
    )
    .unwrap();
    let (status, labels, notices) = run(&["labels", "a.sdf"]);
    assert_eq!(status, Some(0));
    assert!(notices.contains("&1 (atoms 2, 3)"), "{notices}");
    let opposite: String = labels
        .trim_end()
        .rsplit('\t')
        .next()
        .unwrap()
        .chars()
        .map(|c| match c {
            'R' => 'S',
            'S' => 'R',
            other => other,
        })
        .collect();
    let line = opposite.replace(' ', ",");
    let (status, _, errors) = run(&["place", "a.sdf", "--carry", &line, "-o", "b.sdf"]);
    assert_eq!(status, Some(0), "{errors}");
    let placed = fs::read_to_string(folder.path().join("b.sdf")).unwrap();
    for kept in [
        "M  V30 COUNTS 6 5 1 0 0",
        "M  V30 1 DAT 0 ATOMS=(1 5) FIELDNAME=batch FIELDDATA=7",
        "M  V30 MDLV30/STERAC1 ATOMS=(2 2 3)",
        "> <A>\n1",
    ] {
        assert!(placed.contains(kept), "{placed}");
    }
    let (_, again, _) = run(&["labels", "b.sdf"]);
    assert!(again.trim_end().ends_with(&opposite), "{again}");
}
