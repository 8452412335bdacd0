//! `place`: the drawings that carry what is required.

use super::records::{self, FAULT};
use super::wish::Wish;
use super::{Failure, Status, say};
use crate::args::Place;
use crate::files::{self, Piece, Source, Target, name_of, same_file};
use chem::format::{Notice, Record, WriteOptions, molfile, sdf};
use chem::pipeline;
use chem::solve::require::Requirement;
use std::path::Path;

/// Data fields that this verb writes; those of an earlier run are replaced.
const OURS: [&str; 3] = ["CARRIES", "VERDICT", "REASON"];

/// What became of a record.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Verdict {
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
pub(super) struct Placed {
    /// The molfile to write; none for the one that came.
    pub(super) block: Option<String>,
    pub(super) carries: Option<String>,
    pub(super) verdict: Verdict,
    pub(super) reason: Option<String>,
    /// Whether the record has the data field that holds its requirement.
    pub(super) asked: bool,
    pub(super) notices: Vec<Notice>,
    /// Whether the record itself can be read.
    pub(super) readable: bool,
}

impl Placed {
    /// A record that cannot be read.
    pub(super) fn unreadable(reason: String) -> Placed {
        let mut placed = Placed::cannot(reason, true);
        placed.readable = false;
        placed
    }

    pub(super) fn cannot(reason: String, asked: bool) -> Placed {
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
    let wish = Wish::new(args.carry.as_deref(), args.carry_field.as_deref())?;
    let mut source = Source::open(&args.file)?;
    let mut writer = Writer::new(&args.out, &source.name)?;
    let options = files::dated();
    records::each(
        &mut source,
        args.threads,
        |piece| one(piece, wish, &options),
        |piece, placed| {
            let placed = placed.unwrap_or_else(|| Placed::cannot(FAULT.to_owned(), true));
            writer.take(&piece, &placed)
        },
    )?;
    writer.check_asked(wish)?;
    let replaces = same_file(&args.file, &args.out);
    writer.finish(&name_of(&args.out, "standard output"), replaces)
}

/// Does one record.
fn one(piece: &Piece, wish: Wish<'_>, options: &WriteOptions) -> Placed {
    let record = match piece.read() {
        Ok(record) => record,
        Err(error) => return Placed::unreadable(error.to_string()),
    };
    let (requirement, asked) = wish.of(&record);
    let notices = record.notices.clone();
    let mut placed = match requirement {
        Ok(requirement) => carry(record, &requirement, options),
        Err(reason) => Placed::cannot(reason, true),
    };
    placed.asked = asked;
    placed.notices.splice(0..0, notices);
    placed
}

/// The record's drawing made to carry what is asked.
fn carry(record: Record, requirement: &Requirement, options: &WriteOptions) -> Placed {
    let solution = match pipeline::carry(&record.drawing, requirement) {
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
pub(super) fn written(
    record: &Record,
    carries: &str,
    options: &WriteOptions,
) -> Result<String, String> {
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
pub(super) struct Writer {
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
    pub(super) fn new(out: &Path, name: &str) -> Result<Writer, Failure> {
        Ok(Writer {
            out: Target::create(out)?,
            name: name.to_owned(),
            to_sdf: files::is_sd(out),
            counts: [0; 3],
            read_any: false,
            asked: false,
            unasked: Vec::new(),
        })
    }

    /// Refuses a data field that no record has, and names the records without it.
    pub(super) fn check_asked(&self, wish: Wish<'_>) -> Result<(), Failure> {
        if let (Wish::Field(field), false) = (wish, self.asked) {
            return Err(Failure::NoField {
                name: self.name.clone(),
                field: field.to_owned(),
            });
        }
        self.tell_unasked();
        Ok(())
    }

    pub(super) fn take(&mut self, piece: &Piece, placed: &Placed) -> Result<(), Failure> {
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

    pub(super) fn finish(self, out_name: &str, replaces: bool) -> Result<Status, Failure> {
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
