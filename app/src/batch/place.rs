//! `place`: the drawings that carry what is required.

use super::records::{self, FAULT};
use super::{Failure, Status, say};
use crate::args::Place;
use crate::files::{self, Piece, Source, Target, name_of, same_file};
use chem::format::{Notice, Record, WriteOptions, molfile, sdf};
use chem::pipeline;
use chem::solve::line;
use chem::solve::require::Requirement;

/// Data fields that this verb writes; those of an earlier run are replaced.
const OURS: [&str; 3] = ["CARRIES", "VERDICT", "REASON"];

/// Where a record's requirement comes from.
enum Wish<'a> {
    Line(&'a str),
    Field(&'a str),
}

/// What became of a record.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Verdict {
    Agrees,
    Differs,
    Cannot,
}

impl Verdict {
    fn name(self) -> &'static str {
        match self {
            Verdict::Agrees => "agrees",
            Verdict::Differs => "differs",
            Verdict::Cannot => "cannot",
        }
    }
}

/// A record done with.
struct Placed {
    /// The molfile to write; none for the one that came.
    block: Option<String>,
    carries: Option<String>,
    verdict: Verdict,
    reason: Option<String>,
    /// Whether the record has the data field that holds its requirement.
    asked: bool,
    notices: Vec<Notice>,
    /// Whether the record itself can be read.
    readable: bool,
}

impl Placed {
    fn cannot(reason: String, asked: bool) -> Placed {
        Placed {
            block: None,
            carries: None,
            verdict: Verdict::Cannot,
            reason: Some(reason),
            asked,
            notices: Vec::new(),
            readable: true,
        }
    }
}

pub(super) fn run(args: &Place) -> Result<Status, Failure> {
    let wish = match (&args.carry, &args.carry_field) {
        (Some(line), _) => {
            check(line)?;
            Wish::Line(line)
        }
        (None, Some(field)) => Wish::Field(field),
        (None, None) => {
            return Err(Failure::Arguments(
                "give --carry or --carry-field".to_owned(),
            ));
        }
    };
    let mut source = Source::open(&args.file)?;
    let mut writer = Writer {
        out: Target::create(&args.out)?,
        name: source.name.clone(),
        to_sdf: files::is_sd(&args.out),
        counts: [0; 3],
        read_any: false,
        asked: false,
        unasked: Vec::new(),
    };
    let options = files::dated();
    records::each(
        &mut source,
        args.threads,
        |piece| one(piece, &wish, &options),
        |piece, placed| {
            let placed = placed.unwrap_or_else(|| Placed::cannot(FAULT.to_owned(), true));
            writer.take(&piece, &placed)
        },
    )?;
    if let (Wish::Field(field), false) = (&wish, writer.asked) {
        return Err(Failure::NoField {
            name: source.name.clone(),
            field: (*field).to_owned(),
        });
    }
    writer.tell_unasked();
    let replaces = same_file(&args.file, &args.out);
    writer.finish(&name_of(&args.out, "standard output"), replaces)
}

/// Refuses a line for all records that cannot be read at all, and tells what was noticed in it.
fn check(line: &str) -> Result<(), Failure> {
    let read = line::read(line).map_err(|error| Failure::Carry {
        line: line.to_owned(),
        column: error.column,
        text: error.text,
    })?;
    for note in read.notes.iter().filter(|note| note.is_warning()) {
        say(&format!("--carry '{line}': {}", note.text()));
    }
    Ok(())
}

/// Does one record.
fn one(piece: &Piece, wish: &Wish<'_>, options: &WriteOptions) -> Placed {
    let record = match piece.read() {
        Ok(record) => record,
        Err(error) => {
            let mut placed = Placed::cannot(error.to_string(), true);
            placed.readable = false;
            return placed;
        }
    };
    let (line, asked) = match wish {
        Wish::Line(line) => ((*line).to_owned(), true),
        Wish::Field(name) => match record.field(name) {
            Some(value) => (value.trim().to_owned(), true),
            None => (String::new(), false),
        },
    };
    let notices = record.notices.clone();
    let mut placed = carry(record, &line, options);
    placed.asked = asked;
    placed.notices.splice(0..0, notices);
    placed
}

/// The record's drawing made to carry a line; an empty line asks nothing.
fn carry(record: Record, line: &str, options: &WriteOptions) -> Placed {
    let requirement = if line.is_empty() {
        Requirement::default()
    } else {
        match pipeline::understand(line, &record.drawing) {
            Ok(requirement) => requirement,
            Err(error) => {
                let column = super::column_words(error.column);
                return Placed::cannot(format!("'{line}': {column}{}", error.text), true);
            }
        }
    };
    let solution = match pipeline::carry(&record.drawing, &requirement) {
        Ok(solution) => solution,
        Err(refusal) => return Placed::cannot(refusal.text, true),
    };
    let report = solution.report();
    let carries = report.labels_line();
    let verdict = if report.all_agree() {
        Verdict::Agrees
    } else {
        Verdict::Differs
    };
    let mut notices: Vec<Notice> = report
        .faults()
        .into_iter()
        .map(|text| Notice::new(0, "fault", text))
        .collect();
    let block = if solution.edits().is_empty() {
        None
    } else {
        let known = record.notices.len();
        let record = record.with_drawing(solution.drawing().clone());
        notices.extend(record.notices.iter().skip(known).cloned());
        match written(&record, &carries, options) {
            Ok(block) => Some(block),
            Err(reason) => return Placed::cannot(reason, true),
        }
    };
    Placed {
        block,
        carries: Some(carries),
        verdict,
        reason: None,
        asked: true,
        notices,
        readable: true,
    }
}

/// The molfile of a record, believed only after it has been read back.
fn written(record: &Record, carries: &str, options: &WriteOptions) -> Result<String, String> {
    let block = molfile::write(record, options).map_err(|e| e.to_string())?;
    let again =
        molfile::read(&block, 1).map_err(|e| format!("the new molfile cannot be read: {e}"))?;
    if again.stereo_groups != record.stereo_groups {
        return Err("the stereo groups of the new molfile read otherwise".to_owned());
    }
    if pipeline::carried(&again.drawing).labels == carries {
        Ok(block)
    } else {
        Err("the new drawing reads otherwise once its coordinates are rounded to the four decimals of a molfile; scale it up".to_owned())
    }
}

/// Writes records in their order and counts what became of them.
struct Writer {
    out: Target,
    name: String,
    to_sdf: bool,
    counts: [usize; 3],
    /// Whether any record could be read.
    read_any: bool,
    asked: bool,
    /// Records without the data field that holds what is asked.
    unasked: Vec<usize>,
}

impl Writer {
    fn take(&mut self, piece: &Piece, placed: &Placed) -> Result<(), Failure> {
        if piece.too_long {
            return Err(Failure::Lost {
                name: self.name.clone(),
                record: piece.number,
                text: placed.reason.clone().unwrap_or_default(),
            });
        }
        self.counts[placed.verdict as usize] += 1;
        self.asked |= placed.asked;
        self.read_any |= placed.readable;
        for notice in &placed.notices {
            say(&format!("{}: record {}, {notice}", self.name, piece.number));
        }
        if !placed.asked {
            self.unasked.push(piece.number);
        }
        if let Some(reason) = &placed.reason {
            say(&format!(
                "{}: record {}: cannot: {reason}",
                self.name, piece.number
            ));
        }
        let bytes = self.record(piece, placed);
        self.out.write(&bytes)?;
        Ok(())
    }

    /// The bytes of a record: a molfile alone if it came alone, else with its data fields and ours.
    fn record(&mut self, piece: &Piece, placed: &Placed) -> Vec<u8> {
        let Ok(text) = piece.text() else {
            // no text: kept as it is, with what we have to say of it
            let mut bytes = piece.bytes.clone();
            bytes.extend(b"\n");
            bytes.extend(fields(placed, "\n").as_bytes());
            bytes.extend(b"$$$$\n");
            return bytes;
        };
        let raw = text.raw();
        if piece.number == 1 {
            self.to_sdf |= piece.ended || !raw.data.trim().is_empty();
        }
        let kept = placed.block.is_none();
        let end = if kept { line_end(raw.text) } else { "\n" };
        let mut out = placed
            .block
            .clone()
            .unwrap_or_else(|| raw.molfile.to_owned());
        if self.to_sdf {
            if !out.ends_with(['\n', '\r']) {
                out.push_str(end);
            }
            let others = sdf::without(raw.data, &OURS);
            out.push_str(&others.replace('\n', end));
            out.push_str(&fields(placed, end));
            out.push_str("$$$$");
            out.push_str(end);
        }
        if text.is_latin() {
            let latin = |c: char| u8::try_from(u32::from(c)).unwrap_or(b'?');
            out.chars().map(latin).collect()
        } else {
            out.into_bytes()
        }
    }

    /// Names the records of which nothing was asked, in one line.
    fn tell_unasked(&self) {
        let shown: Vec<String> = self.unasked.iter().take(10).map(usize::to_string).collect();
        if let Some(more) = self.unasked.len().checked_sub(10).filter(|n| *n > 0) {
            say(&format!(
                "{}: records {} and {more} more have no such data field, so nothing is asked of them",
                self.name,
                shown.join(", ")
            ));
        } else if !shown.is_empty() {
            say(&format!(
                "{}: no such data field, so nothing is asked: record {}",
                self.name,
                shown.join(", ")
            ));
        }
    }

    fn finish(self, out_name: &str, replaces: bool) -> Result<Status, Failure> {
        let [agrees, differs, cannot] = self.counts;
        if !self.to_sdf && agrees == 0 {
            // a molfile has no field to say that it does not carry what was asked
            say(&format!("{out_name}: not written"));
            return Ok(if self.read_any {
                Status::Wrong
            } else {
                Status::Unusable
            });
        }
        self.out.save()?;
        if replaces {
            say(&format!("{out_name}: the input was replaced by its result"));
        }
        if differs + cannot == 0 {
            return Ok(Status::Good);
        }
        say(&format!(
            "{}: {agrees} records agree, {differs} differ, {cannot} cannot and were written unchanged",
            self.name
        ));
        Ok(Status::Wrong)
    }
}

/// Our data fields.
fn fields(placed: &Placed, end: &str) -> String {
    let mut out = String::new();
    if let Some(carries) = &placed.carries {
        out += &sdf::field_text("CARRIES", carries);
    }
    out += &sdf::field_text("VERDICT", placed.verdict.name());
    if let Some(reason) = &placed.reason {
        out += &sdf::field_text("REASON", &reason.replace(['\n', '\r'], " "));
    }
    out.replace('\n', end)
}

fn line_end(text: &str) -> &'static str {
    match text.find(['\n', '\r']).and_then(|i| text.get(i..)) {
        Some(rest) if rest.starts_with("\r\n") => "\r\n",
        Some(rest) if rest.starts_with('\r') => "\r",
        _ => "\n",
    }
}
