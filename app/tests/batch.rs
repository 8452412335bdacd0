//! The command line from outside: what it prints, writes, refuses and leaves alone.
#![allow(
    clippy::unwrap_used,
    clippy::expect_used,
    reason = "a test may fail by a panic, its helpers too"
)]

use std::fs;
use std::io::Write;
use std::path::{Path, PathBuf};
use std::process::{Command, Stdio};
use tempfile::TempDir;

/// Alanine: atoms C, C, N, C, O, O; the marked bond goes from the second to the third.
fn alanine(code: u8) -> String {
    format!(
        "N-17 batch 4
  test    01020304052D

  6  5  0  0  0  0  0  0  0  0999 V2000
    0.0000    0.0000    0.0000 C   0  0
    1.2990    0.7500    0.0000 C   0  0
    1.2990    2.2500    0.0000 N   0  0
    2.5980    0.0000    0.0000 C   0  0
    2.5980   -1.5000    0.0000 O   0  0
    3.8970    0.7500    0.0000 O   0  0
  1  2  1  0
  2  3  1  {code}
  2  4  1  0
  4  5  2  0
  4  6  1  0
M  END
"
    )
}

struct Bench(TempDir);

struct Answer {
    status: i32,
    out: String,
    err: String,
}

impl Answer {
    /// Checks the status and that each word stands in the messages.
    #[track_caller]
    fn says(&self, status: i32, words: &[&str]) {
        assert_eq!(self.status, status, "{}", self.err);
        for word in words {
            assert!(self.err.contains(word), "'{word}' is not in: {}", self.err);
        }
        assert!(!self.err.contains("panicked"), "{}", self.err);
    }
}

impl Bench {
    fn new() -> Bench {
        Bench(tempfile::tempdir().unwrap())
    }

    fn path(&self, name: &str) -> PathBuf {
        self.0.path().join(name)
    }

    fn put(&self, name: &str, content: impl AsRef<[u8]>) -> &Bench {
        fs::write(self.path(name), content).unwrap();
        self
    }

    fn text(&self, name: &str) -> String {
        fs::read_to_string(self.path(name)).unwrap()
    }

    fn command(&self, words: &[&str]) -> Command {
        let mut command = Command::new(env!("CARGO_BIN_EXE_wedgewright"));
        command.args(words).current_dir(self.0.path());
        for name in ["DISPLAY", "WAYLAND_DISPLAY", "WAYLAND_SOCKET"] {
            command.env_remove(name);
        }
        command
    }

    fn run(&self, words: &[&str]) -> Answer {
        self.run_with(words, b"")
    }

    fn run_with(&self, words: &[&str], input: &[u8]) -> Answer {
        let mut child = self
            .command(words)
            .stdin(Stdio::piped())
            .stdout(Stdio::piped())
            .stderr(Stdio::piped())
            .spawn()
            .unwrap();
        // a program that refuses its arguments reads nothing
        let _ = child.stdin.take().unwrap().write_all(input);
        let output = child.wait_with_output().unwrap();
        Answer {
            status: output.status.code().expect("it ended by itself"),
            out: String::from_utf8(output.stdout).unwrap(),
            err: String::from_utf8(output.stderr).unwrap(),
        }
    }

    /// Names of all files, sorted: nothing may be left behind.
    fn files(&self) -> Vec<String> {
        let mut names: Vec<String> = fs::read_dir(self.0.path())
            .unwrap()
            .map(|e| e.unwrap().file_name().into_string().unwrap())
            .collect();
        names.sort();
        names
    }
}

fn sdf(records: &[(String, &str)]) -> String {
    let text = |(mol, data): &(String, &str)| format!("{mol}{data}$$$$\n");
    records.iter().map(text).collect()
}

fn fields(record: &str) -> Vec<(String, String)> {
    let raw = chem::format::sdf::records(record).next().unwrap();
    let list = chem::format::sdf::fields(raw.data, 1, &mut Vec::new());
    list.into_iter().map(|f| (f.name, f.value)).collect()
}

fn field<'a>(fields: &'a [(String, String)], name: &str) -> Option<&'a str> {
    let found = fields.iter().find(|(n, _)| n == name);
    found.map(|(_, value)| value.as_str())
}

// ---- labels

#[test]
fn labels_in_a_table() {
    let bench = Bench::new();
    let text = sdf(&[(alanine(1), ""), (alanine(0), ""), (alanine(6), "")]);
    let answer = bench.put("a.sdf", text).run(&["labels", "a.sdf"]);
    answer.says(0, &[]);
    let [first, second, third]: [&str; 3] =
        answer.out.lines().collect::<Vec<_>>().try_into().unwrap();
    assert_eq!(second, "2\tN-17 batch 4\t");
    let letter = |line: &str| line.rsplit('\t').next().unwrap().to_owned();
    let mut letters = [letter(first), letter(third)];
    letters.sort();
    assert_eq!(letters, ["2R", "2S"]);
}

#[test]
fn labels_as_json() {
    let bench = Bench::new();
    let broken = alanine(1).replace(" N ", " Xx");
    bench.put("a.sdf", sdf(&[(alanine(1), ""), (broken, "")]));
    let answer = bench.run(&["labels", "a.sdf", "--json"]);
    answer.says(1, &["a.sdf: record 2", "'Xx'"]);
    let list: Vec<serde_json::Value> = answer
        .out
        .lines()
        .map(|line| serde_json::from_str(line).unwrap())
        .collect();
    assert_eq!(list[0]["title"], "N-17 batch 4");
    assert_eq!(list[0]["units"][0]["atoms"], serde_json::json!([2]));
    assert_eq!(list[0]["units"][0]["kind"], "tetrahedral");
    assert_eq!(list[0]["units"][0]["sense"], "defined");
    assert_eq!(
        list[0]["units"][0]["ranking"],
        serde_json::json!([3, 4, 1, "H"])
    );
    assert!(list[0]["error"].is_null());
    assert_eq!(list[1]["record"], 2);
    assert_eq!(list[1]["error"]["line"], 24);
    assert_eq!(list[1]["error"]["columns"], serde_json::json!([32, 33]));
}

#[test]
fn several_files_and_standard_input() {
    let bench = Bench::new();
    bench.put("a.mol", alanine(1));
    let answer = bench.run_with(
        &["labels", "a.mol", "missing.mol", "-"],
        alanine(0).as_bytes(),
    );
    answer.says(2, &["missing.mol: there is no such file"]);
    let firsts: Vec<&str> = answer.out.lines().map(|l| &l[..2]).collect();
    assert_eq!(firsts, ["# ", "1\t", "# ", "1\t"]);
}

#[test]
fn threads_keep_the_order() {
    let bench = Bench::new();
    let records: Vec<(String, &str)> = (0..700)
        .map(|i| {
            (
                alanine([0, 1, 6][i % 3]).replace("batch 4", &format!("batch {i}")),
                "",
            )
        })
        .collect();
    bench.put("a.sdf", sdf(&records));
    let one = bench.run(&["labels", "a.sdf", "--threads", "1"]);
    let many = bench.run(&["labels", "a.sdf", "--threads", "5"]);
    one.says(0, &[]);
    assert_eq!(one.out.lines().count(), 700);
    assert_eq!(one.out, many.out);
    bench
        .run(&["labels", "a.sdf", "--threads", "0"])
        .says(2, &["--threads"]);
}

// ---- bad input

#[test]
fn broken_records_are_named_and_the_others_served() {
    let bench = Bench::new();
    let wrong_counts = alanine(1).replace("  6  5  0", "  6  4  0");
    let no_counts = alanine(1)
        .replace("V2000", "")
        .replace("  6  5  0", "so many");
    bench.put(
        "a.sdf",
        sdf(&[(wrong_counts, ""), (alanine(1), ""), (no_counts, "")]),
    );
    let answer = bench.run(&["labels", "a.sdf"]);
    answer.says(
        1,
        &[
            "a.sdf: record 1, line 4, columns 1-6",
            "6 atoms and 4 bonds",
            "6 lines of atoms and 5 of bonds",
            "write   6  5",
            "a.sdf: record 3, line 38",
            "counts line",
        ],
    );
    assert_eq!(answer.out.lines().count(), 1);
    assert!(answer.out.starts_with("2\t"));
}

#[test]
fn what_is_no_molfile_is_refused_at_once() {
    let bench = Bench::new();
    bench
        .put("empty.sdf", "")
        .put("blank.sdf", "\n \n")
        .put("binary.sdf", [0x7f, b'E', b'L', b'F', 0, 1, 2, 3])
        .put(
            "wide.sdf",
            "a\nb\n"
                .encode_utf16()
                .flat_map(u16::to_le_bytes)
                .collect::<Vec<_>>(),
        )
        .put("prose.sdf", "Dear colleague,\n\nhere are the drawings.\n")
        .put("broken.mol", alanine(1).replace("  2  3  1", "  2  9  1"))
        .put(
            "large.sdf",
            "no drawing in this line\n".repeat(100_000_000 / 24),
        );
    let start = std::time::Instant::now();
    for (file, words) in [
        ("empty.sdf", "there is nothing in it"),
        ("blank.sdf", "there is nothing in it"),
        ("binary.sdf", "this is no text"),
        ("wide.sdf", "UTF-16"),
        ("prose.sdf", "no molfile and no SD file"),
        ("broken.mol", "line 12, columns 4-6: atom 9 is named"),
        ("large.sdf", "no molfile and no SD file"),
        ("missing.sdf", "there is no such file"),
        (".", "directory"),
    ] {
        bench.run(&["labels", file]).says(2, &[file, words]);
        let place = ["place", file, "--carry", "(2R)", "-o", "out.mol"];
        bench.run(&place).says(2, &[file, words]);
        bench
            .run(&["figure", file, "-o", "out.svg"])
            .says(2, &[file, words]);
    }
    assert!(start.elapsed().as_secs() < 30, "{:?}", start.elapsed());
    assert!(
        !bench
            .files()
            .iter()
            .any(|f| f.starts_with("out") || f.starts_with('.'))
    );
}

#[test]
fn two_atoms_on_one_spot_are_told() {
    let bench = Bench::new();
    let text = alanine(1).replace("    2.5980    0.0000", "    1.2990    0.7500");
    bench.put("a.mol", text);
    let answer = bench.run(&["labels", "a.mol"]);
    answer.says(
        1,
        &["a.mol: record 1, line 8", "atoms 2 and 4 stand on one spot"],
    );
    // a centre that cannot be seen carries nothing
    assert_eq!(answer.out, "1\tN-17 batch 4\t\n");
}

#[test]
fn unusable_arguments() {
    let bench = Bench::new();
    bench.put("a.mol", alanine(1));
    for words in [
        &["labels"][..],
        &["labels", "a.mol", "--speed"],
        &["place", "a.mol", "-o", "b.mol"],
        &["place", "a.mol", "--carry", "(2R)"],
        &[
            "place",
            "a.mol",
            "--carry",
            "(2R)",
            "--carry-field",
            "X",
            "-o",
            "b.mol",
        ],
        &["figure", "a.mol", "-o", "b.svg", "--width", "84"],
        &["figure", "a.mol", "-o", "b.svg", "--style", "poster"],
    ] {
        bench.run(words).says(2, &["error"]);
    }
    assert_eq!(bench.files(), ["a.mol"]);
    bench.run(&["--help"]).says(0, &[]);
}

#[test]
fn without_a_display_there_is_a_plain_error() {
    let bench = Bench::new();
    bench.put("a.mol", alanine(1));
    bench
        .run(&[])
        .says(2, &["wedgewright: no window could be opened"]);
    bench
        .run(&["a.mol"])
        .says(2, &["no window could be opened"]);
    bench.run(&["missing.mol"]).says(2, &["missing.mol"]);
}

// ---- place

#[test]
fn place_draws_what_is_asked() {
    let bench = Bench::new();
    bench.put("a.mol", alanine(0));
    for letter in ["R", "S"] {
        let wish = format!("(2{letter})");
        bench
            .run(&["place", "a.mol", "--carry", &wish, "-o", "b.mol"])
            .says(0, &[]);
        let read = bench.run(&["labels", "b.mol"]);
        assert_eq!(read.out, format!("1\tN-17 batch 4\t2{letter}\n"));
        // a molfile stays one
        assert!(bench.text("b.mol").ends_with("M  END\n"));
        assert_eq!(bench.text("a.mol"), alanine(0));
    }
    // what carries it already is left as it is
    let drawn = bench.text("b.mol");
    bench
        .run(&["place", "b.mol", "--carry", "(2S)", "-o", "c.mol"])
        .says(0, &[]);
    assert_eq!(bench.text("c.mol"), drawn);
    let piped = bench.run_with(
        &["place", "-", "--carry", "2S", "-o", "-"],
        drawn.as_bytes(),
    );
    assert_eq!((piped.status, piped.out), (0, drawn));
}

#[test]
fn place_by_data_field() {
    let bench = Bench::new();
    let broken = alanine(1).replace(" N ", " Xx").replace('\n', "\r\n");
    let records = [
        (
            alanine(0),
            "> <ID>\n7\n\n> <WANT>\n(2R)\n\n> <REASON>\nold\n\n> <MORE> (x)\na\n\n",
        ),
        (alanine(0), "> <WANT>\n(5R)\n\n"),
        (broken, "> <WANT>\r\n(2R)\r\n\r\n"),
        (alanine(1), "> <ID>\n8\n\n"),
    ];
    bench.put("a.sdf", sdf(&records));
    let answer = bench.run(&["place", "a.sdf", "--carry-field", "WANT", "-o", "b.sdf"]);
    answer.says(
        1,
        &[
            "a.sdf: record 2: cannot",
            "a.sdf: record 3: cannot",
            "no such data field, so nothing is asked: record 4",
        ],
    );
    let text = bench.text("b.sdf");
    let out: Vec<&str> = text
        .split_terminator("$$$$")
        .map(str::trim_start)
        .filter(|r| !r.is_empty())
        .collect();
    assert_eq!(out.len(), 4);
    let first = fields(out[0]);
    let names: Vec<&str> = first.iter().map(|f| f.0.as_str()).collect();
    assert_eq!(names, ["ID", "WANT", "MORE", "CARRIES", "VERDICT"]);
    assert!(out[0].contains("> <MORE> (x)\na\n\n"));
    assert_eq!(
        (field(&first, "CARRIES"), field(&first, "VERDICT")),
        (Some("2R"), Some("agrees"))
    );
    // what cannot be served stays byte for byte
    for i in [1, 2] {
        assert!(out[i].starts_with(&records[i].0), "{}", out[i]);
        assert!(out[i].contains(records[i].1));
        let fields = fields(out[i]);
        assert_eq!(field(&fields, "VERDICT"), Some("cannot"));
        assert!(field(&fields, "REASON").is_some_and(|r| !r.is_empty()));
        assert_eq!(field(&fields, "CARRIES"), None);
    }
    assert!(
        field(&fields(out[2]), "REASON")
            .unwrap()
            .contains("line 56, columns 32-33")
    );
    // nothing asked: nothing changed
    assert!(out[3].starts_with(&alanine(1)));
    assert_eq!(field(&fields(out[3]), "VERDICT"), Some("agrees"));
}

#[test]
fn lines_that_do_not_fit_the_drawing() {
    let bench = Bench::new();
    bench.put("a.mol", alanine(1)).put("old.mol", "as it was");
    for (line, status, words) in [
        ("(40R)", 1, "no atom 40"),
        ("(2E)", 1, "column 2"),
        ("(5R)", 1, "not stereogenic"),
        ("(2R,2S)", 2, "both R and S"),
        ("(2Q)", 2, "column 2: 'Q'"),
        ("", 2, "empty"),
    ] {
        let answer = bench.run(&["place", "a.mol", "--carry", line, "-o", "old.mol"]);
        answer.says(status, &[words]);
        assert_eq!(bench.text("old.mol"), "as it was", "{line}");
    }
    assert_eq!(bench.files(), ["a.mol", "old.mol"]);
}

#[test]
fn a_field_that_no_record_has_is_a_slip() {
    let bench = Bench::new();
    bench
        .put("a.sdf", sdf(&[(alanine(0), "> <WANT>\n(2R)\n\n")]))
        .put("b.sdf", "as it was");
    let answer = bench.run(&["place", "a.sdf", "--carry-field", "WAMT", "-o", "b.sdf"]);
    answer.says(2, &["a.sdf: no record has a data field 'WAMT'"]);
    assert_eq!(bench.text("b.sdf"), "as it was");
    assert_eq!(bench.files(), ["a.sdf", "b.sdf"]);
}

#[test]
fn targets_that_cannot_be_written() {
    let bench = Bench::new();
    bench.put("a.mol", alanine(0));
    fs::create_dir(bench.path("folder")).unwrap();
    let place = |out: &str| bench.run(&["place", "a.mol", "--carry", "(2R)", "-o", out]);
    place("folder").says(2, &["folder: this is a directory"]);
    place("missing/b.mol").says(2, &["missing/b.mol: cannot be written"]);
    bench
        .run(&["figure", "a.mol", "-o", "missing/b.svg"])
        .says(2, &["missing/b.svg: cannot be written"]);
    assert_eq!(bench.files(), ["a.mol", "folder"]);
}

#[test]
fn the_input_is_replaced_only_when_it_is_said_and_whole() {
    let bench = Bench::new();
    bench.put("a.mol", alanine(0));
    let answer = bench.run(&["place", "a.mol", "--carry", "(2R)", "-o", "./a.mol"]);
    answer.says(0, &["./a.mol: the input was replaced by its result"]);
    assert_ne!(bench.text("a.mol"), alanine(0));
    let drawn = bench.text("a.mol");
    bench
        .run(&["place", "a.mol", "--carry", "(40R)", "-o", "a.mol"])
        .says(1, &["not written"]);
    assert_eq!(bench.text("a.mol"), drawn);
    fs::copy(bench.path("a.mol"), bench.path("a.svg")).unwrap();
    bench
        .run(&["figure", "a.svg", "-o", "a.svg"])
        .says(2, &["its own input"]);
    assert_eq!(bench.text("a.svg"), drawn);
}

#[test]
fn records_in_another_code_keep_their_bytes() {
    let bench = Bench::new();
    let text = sdf(&[(alanine(0), "> <WANT>\n(2R)\n\n> <PLANT>\nM?nster\n\n")]);
    let latin: Vec<u8> = text
        .bytes()
        .map(|b| if b == b'?' { 0xFC } else { b })
        .collect();
    bench.put("a.sdf", latin);
    let answer = bench.run(&["place", "a.sdf", "--carry-field", "WANT", "-o", "b.sdf"]);
    answer.says(0, &["not UTF-8"]);
    let out = fs::read(bench.path("b.sdf")).unwrap();
    assert!(out.windows(8).any(|w| w == b"M\xFCnster\n"));
}

// ---- figure and line

#[test]
fn figures_in_each_format() {
    let bench = Bench::new();
    bench
        .put("a.mol", alanine(1))
        .put("two.sdf", sdf(&[(alanine(1), ""), (alanine(6), "")]));
    for (name, start) in [
        ("a.svg", &b"<"[..]),
        ("a.pdf", b"%PDF"),
        ("a.png", b"\x89PNG"),
    ] {
        bench
            .run(&["figure", "a.mol", "-o", name, "--descriptors"])
            .says(0, &[]);
        assert!(
            fs::read(bench.path(name)).unwrap().starts_with(start),
            "{name}"
        );
    }
    let piped = bench.run(&["figure", "a.mol", "-o", "-"]);
    assert!(piped.status == 0 && piped.out.contains("<svg"));
    bench
        .run(&["figure", "a.mol", "-o", "a.gif"])
        .says(2, &[".svg, .pdf or .png"]);
    bench
        .run(&["figure", "two.sdf", "-o", "b.svg"])
        .says(2, &["--record N"]);
    bench
        .run(&["figure", "two.sdf", "-o", "b.svg", "--record", "2"])
        .says(0, &[]);
    bench
        .run(&["figure", "two.sdf", "-o", "c.svg", "--record", "3"])
        .says(2, &["there is no record 3; it holds 2"]);
    bench
        .run(&["figure", "a.mol", "-o", "c.svg", "--width", "5mm"])
        .says(1, &["wide", "not written"]);
    assert!(!bench.path("c.svg").exists());
}

#[test]
fn requirement_lines() {
    let bench = Bench::new();
    let one = bench.run(&["line", "1R 2S"]);
    assert_eq!((one.status, one.out.as_str()), (0, "(1R,2S)\n"));
    bench.run(&["line", "(1Q)"]).says(1, &["column 2: 'Q'"]);
    let many = bench.run_with(&["line", "-", "--json"], b"(1R,2S)\r\nR1\nrac-(1R)\n");
    many.says(1, &[]);
    let list: Vec<serde_json::Value> = many
        .out
        .lines()
        .map(|line| serde_json::from_str(line).unwrap())
        .collect();
    assert_eq!(list.len(), 3);
    assert_eq!(list[0]["in"], "(1R,2S)");
    assert_eq!(list[0]["items"], serde_json::json!(["1:R", "2:S"]));
    assert_eq!(list[1]["error"]["code"], "E-ORDER");
    assert_eq!(list[2]["status"], "rac");
    bench
        .run_with(&["line", "-"], &[0xFF, b'R', b'\n'])
        .says(1, &["line 1"]);
    bench
        .run_with(&["line", "-"], &vec![b'R'; 3_000_000])
        .says(1, &["line 1"]);
}

#[test]
fn names_do_not_matter_contents_do() {
    let bench = Bench::new();
    bench.put("a.txt", sdf(&[(alanine(1), "")]));
    assert!(Path::new(&bench.path("a.txt")).exists());
    bench.run(&["labels", "a.txt"]).says(0, &[]);
    bench
        .run(&["place", "a.txt", "--carry", "(2R)", "-o", "b.dat"])
        .says(0, &[]);
    assert!(bench.text("b.dat").ends_with("$$$$\n"));
}
