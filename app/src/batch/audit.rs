//! `audit`: what a reader could take wrongly in each drawing.

use super::records::{self, FAULT};
use super::wish::Wish;
use super::{Failure, Status, each_file, say};
use crate::args::Audit;
use crate::files::{Piece, Source, Target};
use chem::audit::{self, Finding, Grade};
use chem::format::Notice;
use serde::Serialize;
use std::path::Path;

/// One record's answer.
struct Answer {
    /// The lines for standard output.
    lines: String,
    error: Option<String>,
    notices: Vec<Notice>,
    /// Whether anything is wrong or unclear.
    faulty: bool,
    /// Whether the record has the data field that holds its requirement.
    asked: bool,
}

pub(super) fn run(args: &Audit) -> Result<Status, Failure> {
    let wish = Wish::new(args.carry.as_deref(), args.carry_field.as_deref())?;
    each_file(&args.files, |path, out| one_file(path, args, wish, out))
}

fn one_file(
    path: &Path,
    args: &Audit,
    wish: Wish<'_>,
    out: &mut Target,
) -> Result<Status, Failure> {
    let mut source = Source::open(path)?;
    let name = source.name.clone();
    let many = args.files.len() > 1;
    if many && !args.json {
        out.write(format!("# {name}\n").as_bytes())?;
    }
    let file = many.then_some(name.as_str());
    let (mut good, mut bad, mut faulty, mut asked) = (0usize, 0usize, 0usize, false);
    records::each(
        &mut source,
        args.threads,
        |piece| one(piece, wish, args.json, file),
        |piece, answer| {
            let number = piece.number;
            let answer =
                answer.unwrap_or_else(|| failed(&piece, FAULT.to_owned(), args.json, file));
            for notice in &answer.notices {
                say(&format!("{name}: record {number}, {notice}"));
            }
            asked |= answer.asked;
            faulty += usize::from(answer.faulty);
            match &answer.error {
                Some(error) => {
                    bad += 1;
                    say(&format!("{name}: record {number}, {error}"));
                }
                None => good += 1,
            }
            out.write(answer.lines.as_bytes())?;
            Ok(())
        },
    )?;
    if let (Wish::Field(field), false) = (wish, asked) {
        return Err(Failure::NoField {
            name,
            field: field.to_owned(),
        });
    }
    Ok(match (good, bad) {
        (_, 0) if faulty == 0 => Status::Good,
        (0, bad) if bad > 0 => Status::Unusable,
        _ => Status::Wrong,
    })
}

fn one(piece: &Piece, wish: Wish<'_>, json: bool, file: Option<&str>) -> Answer {
    let record = match piece.read() {
        Ok(record) => record,
        Err(error) => return failed(piece, error.to_string(), json, file),
    };
    let (requirement, asked) = wish.of(&record);
    let requirement = match requirement {
        Ok(requirement) => requirement,
        Err(reason) => {
            let mut answer = failed(piece, reason, json, file);
            answer.notices = record.notices;
            return answer;
        }
    };
    let found = audit::audit_record(&record, &requirement);
    let faulty = found
        .iter()
        .any(|f| matches!(f.grade, Grade::Wrong | Grade::Unclear));
    let lines = if json {
        in_json(piece, file, &found, None)
    } else {
        found.iter().map(|f| in_table(piece, f)).collect()
    };
    Answer {
        lines,
        error: None,
        notices: record.notices,
        faulty,
        asked,
    }
}

fn failed(piece: &Piece, error: String, json: bool, file: Option<&str>) -> Answer {
    let lines = if json {
        in_json(piece, file, &[], Some(&error))
    } else {
        String::new()
    };
    Answer {
        lines,
        error: Some(error),
        notices: Vec::new(),
        faulty: true,
        asked: true,
    }
}

/// Record, title, grade, kind, atoms and sentence, parted by tabs.
fn in_table(piece: &Piece, f: &Finding) -> String {
    let atoms: Vec<String> = f
        .atoms
        .iter()
        .map(|a| (a.index() + 1).to_string())
        .collect();
    format!(
        "{}\t{}\t{}\t{}\t{}\t{}\n",
        piece.number,
        piece.title(),
        f.grade.name(),
        f.kind.name(),
        atoms.join(" "),
        f.text
    )
}

fn in_json(piece: &Piece, file: Option<&str>, found: &[Finding], error: Option<&str>) -> String {
    let json = RecordJson {
        file,
        record: piece.number,
        title: piece.title(),
        findings: found.iter().map(FindingJson::new).collect(),
        error,
    };
    let mut line = serde_json::to_string(&json).unwrap_or_default();
    line.push('\n');
    line
}

#[derive(Serialize)]
struct RecordJson<'a> {
    #[serde(skip_serializing_if = "Option::is_none")]
    file: Option<&'a str>,
    record: usize,
    title: String,
    findings: Vec<FindingJson<'a>>,
    error: Option<&'a str>,
}

/// A finding in files: atoms and bonds by number from 1.
#[derive(Serialize)]
pub(super) struct FindingJson<'a> {
    kind: &'static str,
    grade: &'static str,
    atoms: Vec<usize>,
    bonds: Vec<usize>,
    text: &'a str,
    clause: &'static str,
    /// Where the clause and its grade are known from.
    clause_known: &'static str,
    grade_known: &'static str,
    mends: Vec<MendJson<'a>>,
}

#[derive(Serialize)]
struct MendJson<'a> {
    keeps_meaning: bool,
    text: &'a str,
}

impl<'a> FindingJson<'a> {
    pub(super) fn new(f: &'a Finding) -> FindingJson<'a> {
        let mends = f.mends.iter().map(|m| MendJson {
            keeps_meaning: m.keeps_meaning,
            text: &m.text,
        });
        FindingJson {
            kind: f.kind.name(),
            grade: f.grade.name(),
            atoms: f.atoms.iter().map(|a| a.index() + 1).collect(),
            bonds: f.bonds.iter().map(|b| b.index() + 1).collect(),
            text: &f.text,
            clause: f.clause.name,
            clause_known: f.clause.source.words(),
            grade_known: f.clause.grade.words(),
            mends: mends.collect(),
        }
    }
}
