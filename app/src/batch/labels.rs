//! `labels`: what each drawing carries.

use super::records::{self, FAULT};
use super::{Failure, Status, each_file, say};
use crate::args::Labels;
use crate::files::{Piece, Source, Target};
use chem::cip::{Compared, Tie};
use chem::format::{Notice, ReadError};
use chem::pipeline::{self, Place};
use chem::solve::require::Requirement;
use chem::stereo::Ligand;
use serde::Serialize;
use std::path::Path;

/// One record's answer.
struct Answer {
    /// The line for standard output, without its end; none for a record that cannot be read.
    line: Option<String>,
    error: Option<String>,
    notices: Vec<Notice>,
    /// What the labels alone do not show: contradictions, wedges that say nothing.
    faults: Vec<String>,
    /// Letters that rest on open places.
    notes: Vec<String>,
}

pub(super) fn run(args: &Labels) -> Result<Status, Failure> {
    let many = args.files.len() > 1;
    each_file(&args.files, |path, out| one_file(path, many, args, out))
}

fn one_file(path: &Path, many: bool, args: &Labels, out: &mut Target) -> Result<Status, Failure> {
    let mut source = Source::open_also_notation(path)?;
    let name = source.name.clone();
    if many && !args.json {
        out.write(format!("# {name}\n").as_bytes())?;
    }
    let file = many.then_some(name.as_str());
    let (mut good, mut bad, mut faulty) = (0usize, 0usize, 0usize);
    records::each(
        &mut source,
        args.threads,
        |piece| {
            if args.json {
                in_json(piece, file)
            } else {
                in_table(piece)
            }
        },
        |piece, answer| {
            let number = piece.number;
            let answer = answer.unwrap_or_else(|| Answer {
                line: args.json.then(|| fault_in_json(&piece, file)),
                error: Some(FAULT.to_owned()),
                notices: Vec::new(),
                faults: Vec::new(),
                notes: Vec::new(),
            });
            for notice in &answer.notices {
                say(&format!("{name}: record {number}, {notice}"));
            }
            for fault in answer.faults.iter().chain(&answer.notes) {
                say(&format!("{name}: record {number}, {fault}"));
            }
            faulty += usize::from(!answer.faults.is_empty());
            match &answer.error {
                Some(error) => {
                    bad += 1;
                    say(&format!("{name}: record {number}, {error}"));
                }
                None => good += 1,
            }
            if let Some(line) = answer.line {
                out.write(line.as_bytes())?;
                out.write(b"\n")?;
            }
            Ok(())
        },
    )?;
    Ok(match (good, bad) {
        (_, 0) if faulty == 0 => Status::Good,
        (_, 0) => Status::Wrong,
        (0, _) => Status::Unusable,
        _ => Status::Wrong,
    })
}

/// What one record carries.
struct Carried<T> {
    labels: T,
    faults: Vec<String>,
    notes: Vec<String>,
    notices: Vec<Notice>,
}

/// The labels of a record alone, which is quicker than a report.
fn labels_of(piece: &Piece) -> Result<Carried<String>, ReadError> {
    let (carried, notices) = if piece.is_notation {
        let line = piece.read_notation()?;
        let (units, configurations) = (&line.units, &line.configurations);
        let carried = pipeline::labels_of(&line.molecule, &line.rings, units, configurations);
        (carried, line.notices)
    } else {
        let record = piece.read()?;
        (pipeline::carried(&record.drawing), record.notices)
    };
    Ok(Carried {
        labels: carried.labels,
        faults: carried.faults,
        notes: carried.notes,
        notices,
    })
}

/// Every place of a record, with why.
fn report_of(piece: &Piece) -> Result<Carried<Vec<UnitJson>>, ReadError> {
    let (report, whys, notices) = if piece.is_notation {
        let line = piece.read_notation()?;
        let report = pipeline::report_of(&line);
        let whys = pipeline::explain_of(&line, &report.places);
        (report, whys, line.notices)
    } else {
        let record = piece.read()?;
        let report = pipeline::report(&record.drawing, &Requirement::default());
        let whys = pipeline::explain(&record.drawing, &report.places);
        (report, whys, record.notices)
    };
    let units = report.places.iter().zip(whys);
    Ok(Carried {
        labels: units
            .map(|(place, why)| UnitJson::new(place, why))
            .collect(),
        faults: report.faults(),
        notes: Vec::new(),
        notices,
    })
}

fn in_table(piece: &Piece) -> Answer {
    match labels_of(piece) {
        Ok(carried) => Answer {
            line: Some(format!(
                "{}\t{}\t{}",
                piece.number,
                piece.title(),
                carried.labels
            )),
            error: None,
            faults: carried.faults,
            notes: carried.notes,
            notices: carried.notices,
        },
        Err(error) => Answer {
            line: None,
            error: Some(error.to_string()),
            notices: Vec::new(),
            faults: Vec::new(),
            notes: Vec::new(),
        },
    }
}

fn in_json(piece: &Piece, file: Option<&str>) -> Answer {
    let (units, faults, error, notices) = match report_of(piece) {
        Ok(carried) => (carried.labels, carried.faults, None, carried.notices),
        Err(error) => (Vec::new(), Vec::new(), Some(error), Vec::new()),
    };
    let json = RecordJson {
        file,
        record: piece.number,
        title: piece.title(),
        units,
        error: error.as_ref().map(ErrorJson::new),
    };
    Answer {
        line: serde_json::to_string(&json).ok(),
        error: error.map(|e| e.to_string()),
        notices,
        faults,
        notes: Vec::new(),
    }
}

fn fault_in_json(piece: &Piece, file: Option<&str>) -> String {
    let json = RecordJson {
        file,
        record: piece.number,
        title: piece.title(),
        units: Vec::new(),
        error: Some(ErrorJson {
            line: piece.line,
            columns: None,
            text: FAULT.to_owned(),
        }),
    };
    serde_json::to_string(&json).unwrap_or_default()
}

#[derive(Serialize)]
struct RecordJson<'a> {
    #[serde(skip_serializing_if = "Option::is_none")]
    file: Option<&'a str>,
    record: usize,
    title: String,
    units: Vec<UnitJson>,
    error: Option<ErrorJson>,
}

#[derive(Serialize)]
struct ErrorJson {
    line: usize,
    columns: Option<(usize, usize)>,
    text: String,
}

impl ErrorJson {
    fn new(error: &ReadError) -> ErrorJson {
        ErrorJson {
            line: error.line,
            columns: error.columns,
            text: format!("{}. {}", error.reason, error.reason.remedy()),
        }
    }
}

#[derive(Serialize)]
struct UnitJson {
    kind: &'static str,
    atoms: Vec<usize>,
    carries: Option<String>,
    #[serde(skip_serializing_if = "std::ops::Not::not")]
    provisional: bool,
    sense: &'static str,
    verdict: &'static str,
    rule: Option<&'static str>,
    ranking: Vec<LigandJson>,
    /// For each two neighbors in the ranking (of a pair, one for each end) what parts them.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    why: Vec<Option<TieJson>>,
    #[serde(skip_serializing_if = "String::is_empty")]
    note: String,
}

/// A drawn atom by its number from 1, or what is not drawn by a word.
#[derive(Serialize)]
#[serde(untagged)]
enum LigandJson {
    Atom(usize),
    Word(&'static str),
}

#[derive(Serialize)]
struct TieJson {
    rule: &'static str,
    sphere: u32,
    higher: Vec<ComparedJson>,
    lower: Vec<ComparedJson>,
}

/// A member of a set that was compared: its atom, and what the rule sees in it.
#[derive(Serialize)]
struct ComparedJson {
    atom: usize,
    #[serde(skip_serializing_if = "std::ops::Not::not")]
    duplicate: bool,
    sees: String,
}

impl TieJson {
    fn new(tie: Tie) -> TieJson {
        let compared = |set: Vec<Compared>| {
            set.into_iter()
                .map(|c| ComparedJson {
                    atom: c.atom.index() + 1,
                    duplicate: c.is_duplicate,
                    sees: c.text,
                })
                .collect()
        };
        TieJson {
            rule: tie.rule.name(),
            sphere: tie.sphere,
            higher: compared(tie.higher),
            lower: compared(tie.lower),
        }
    }
}

impl UnitJson {
    fn new(place: &Place, why: Vec<Option<Tie>>) -> UnitJson {
        let ligand = |ligand: &Ligand| match ligand {
            Ligand::Atom(a) => LigandJson::Atom(a.index() + 1),
            Ligand::Hydrogen => LigandJson::Word("H"),
            Ligand::LonePair => LigandJson::Word("lone pair"),
        };
        UnitJson {
            kind: place.kind.name(),
            atoms: place.atoms.iter().map(|a| a.index() + 1).collect(),
            carries: place.carries.map(|d| d.to_string()),
            provisional: place.is_provisional,
            sense: place.sense.name(),
            verdict: place.verdict.name(),
            rule: place.rule.map(chem::cip::Rule::name),
            ranking: place.ranking.iter().map(ligand).collect(),
            why: why.into_iter().map(|tie| tie.map(TieJson::new)).collect(),
            note: place.note.clone(),
        }
    }
}
