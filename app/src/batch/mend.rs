//! `mend`: drawings mended, with a log of what was done and why.

use super::audit::FindingJson;
use super::place::{Placed, Verdict, Writer, written};
use super::records::{self, FAULT};
use super::wish::Wish;
use super::{Failure, Status, say};
use crate::args::Mend;
use crate::files::{self, Piece, Source, Target, name_of, same_file};
use chem::audit::{self, Finding, Grade, Mended, Step, Trait};
use chem::drawing::Mark;
use chem::format::{Notice, Record, WriteOptions};
use chem::pipeline;
use chem::solve::require::Requirement;
use serde::Serialize;

/// A record done with.
struct Done {
    placed: Placed,
    /// Lines of the log.
    log: String,
    /// Whether something wrong or unclear is left.
    left: bool,
}

impl From<Placed> for Done {
    fn from(placed: Placed) -> Done {
        Done {
            placed,
            log: String::new(),
            left: false,
        }
    }
}

pub(super) fn run(args: &Mend) -> Result<Status, Failure> {
    let wish = Wish::new(args.carry.as_deref(), args.carry_field.as_deref())?;
    let mut source = Source::open(&args.file)?;
    if let Some(log) = args
        .log
        .as_deref()
        .filter(|log| same_file(log, &args.out) || same_file(log, &args.file))
    {
        return Err(Failure::Arguments(format!(
            "{}: the log cannot take the place of the drawings; give it another name",
            log.display()
        )));
    }
    let mut writer = Writer::new(&args.out, &source.name)?;
    let mut log = args.log.as_deref().map(Target::create).transpose()?;
    let options = files::dated();
    let mut left = 0usize;
    records::each(
        &mut source,
        args.threads,
        |piece| one(piece, wish, &options),
        |piece, done| {
            let done = done.unwrap_or_else(|| Placed::cannot(FAULT.to_owned(), true).into());
            left += usize::from(done.left);
            if let Some(log) = &mut log {
                log.write(done.log.as_bytes())?;
            }
            writer.take(&piece, &done.placed)
        },
    )?;
    writer.check_asked(wish)?;
    let replaces = same_file(&args.file, &args.out);
    let status = writer.finish(&name_of(&args.out, "standard output"), replaces)?;
    if let Some(log) = log {
        log.save()?;
    }
    if left > 0 {
        say(&format!(
            "{}: in {left} records something wrong or unclear is left that needs a requirement or a person: see `audit`",
            source.name
        ));
        return Ok(status.max(Status::Wrong));
    }
    Ok(status)
}

fn one(piece: &Piece, wish: Wish<'_>, options: &WriteOptions) -> Done {
    let record = match piece.read() {
        Ok(record) => record,
        Err(error) => return Placed::unreadable(error.to_string()).into(),
    };
    let (requirement, asked) = wish.of(&record);
    let notices = record.notices.clone();
    let mut done = match requirement {
        Ok(requirement) => mended(piece, record, &requirement, options),
        Err(reason) => Placed::cannot(reason, true).into(),
    };
    done.placed.asked = asked;
    done.placed.notices.splice(0..0, notices);
    done
}

fn mended(
    piece: &Piece,
    record: Record,
    requirement: &Requirement,
    options: &WriteOptions,
) -> Done {
    let Mended {
        drawing,
        steps,
        left,
    } = audit::mend(&record.drawing, requirement);
    let report = pipeline::report(&drawing, requirement);
    if !report.all_agree() {
        return Placed::cannot(reason(&record, requirement, &left), true).into();
    }
    let carries = report.labels_line();
    let mut notices: Vec<Notice> = Vec::new();
    let block = if steps.is_empty() {
        None
    } else {
        let known = record.notices.len();
        let record = record.with_drawing(drawing);
        notices.extend(record.notices.iter().skip(known).cloned());
        match written(&record, &carries, options) {
            Ok(block) => Some(block),
            Err(reason) => return Placed::cannot(reason, true).into(),
        }
    };
    let lines = steps.iter().enumerate();
    Done {
        log: lines.map(|(i, step)| line(piece, i + 1, step)).collect(),
        left: left.iter().any(is_faulty),
        placed: Placed {
            block,
            carries: Some(carries),
            verdict: Verdict::Agrees,
            reason: None,
            asked: true,
            notices,
            readable: true,
        },
    }
}

fn is_faulty(finding: &Finding) -> bool {
    matches!(finding.grade, Grade::Wrong | Grade::Unclear)
}

/// Why a drawing could not be made to carry what is asked.
fn reason(record: &Record, requirement: &Requirement, left: &[Finding]) -> String {
    match pipeline::carry(&record.drawing, requirement) {
        Err(refusal) => refusal.text,
        Ok(_) => left.iter().find(|f| f.grade == Grade::Wrong).map_or_else(
            || "it does not carry what is asked".to_owned(),
            |f| f.text.clone(),
        ),
    }
}

#[derive(Serialize)]
struct StepJson<'a> {
    record: usize,
    title: String,
    step: usize,
    reason: FindingJson<'a>,
    done: &'a str,
    keeps_meaning: bool,
    before: Vec<TraitJson>,
    after: Vec<TraitJson>,
}

/// A bond with its mark, or an atom with its place; numbers from 1.
#[derive(Serialize)]
#[serde(untagged)]
enum TraitJson {
    Bond {
        bond: usize,
        atoms: [usize; 2],
        mark: &'static str,
    },
    Atom {
        atom: usize,
        x: f64,
        y: f64,
    },
}

fn line(piece: &Piece, number: usize, step: &Step) -> String {
    let json = StepJson {
        record: piece.number,
        title: piece.title(),
        step: number,
        reason: FindingJson::new(&step.reason),
        done: &step.text,
        keeps_meaning: step.keeps_meaning,
        before: step.before.iter().map(in_json).collect(),
        after: step.after.iter().map(in_json).collect(),
    };
    let mut line = serde_json::to_string(&json).unwrap_or_default();
    line.push('\n');
    line
}

fn in_json(item: &Trait) -> TraitJson {
    match item {
        Trait::Mark { bond, atoms, mark } => TraitJson::Bond {
            bond: bond.index() + 1,
            atoms: atoms.map(|a| a.index() + 1),
            mark: match mark {
                Mark::Plain => "plain",
                Mark::Solid(_) => "solid",
                Mark::Hashed(_) => "hashed",
                Mark::Wavy(_) => "wavy",
                Mark::Crossed => "crossed",
            },
        },
        Trait::Place { atom, point } => TraitJson::Atom {
            atom: atom.index() + 1,
            x: point.x,
            y: point.y,
        },
    }
}
