//! `line`: a requirement line read and written in its canonical form.

use super::{Failure, Status, say};
use crate::args::Line as Args;
use crate::files::{FileError, Target};
use chem::solve::line::{self, Line, LineError};
use serde::Serialize;
use std::io::{self, BufRead, Read};
use std::path::Path;

/// Bytes of one line that are looked at; the reader itself refuses far shorter ones.
const LONGEST: u64 = 64 * 1024;

pub(super) fn run(args: &Args) -> Result<Status, Failure> {
    let mut out = Target::create(Path::new("-"))?;
    let mut status = Status::Good;
    if args.text == "-" {
        let mut input = io::stdin().lock();
        let mut number = 0usize;
        while let Some(text) = next_line(&mut input)? {
            number += 1;
            let place = format!("line {number}, ");
            status = status.max(one(&text, &place, args.json, &mut out)?);
        }
    } else {
        status = one(&args.text, "", args.json, &mut out)?;
    }
    out.save()?;
    Ok(status)
}

/// Answers for one line; `place` says which it is, in messages.
fn one(text: &str, place: &str, json: bool, out: &mut Target) -> Result<Status, Failure> {
    let read = line::read(text);
    let status = match &read {
        Ok(_) => Status::Good,
        Err(_) => Status::Wrong,
    };
    let answer = if json {
        serde_json::to_string(&Answer::new(text, &read)).ok()
    } else {
        match read {
            Ok(line) => {
                for note in &line.notes {
                    say(&format!("{place}{}: {}", note.code(), note.text()));
                }
                Some(line.to_string())
            }
            Err(error) => {
                say(&format!("{place}{error} ({})", error.code));
                None
            }
        }
    };
    if let Some(answer) = answer {
        out.write(answer.as_bytes())?;
        out.write(b"\n")?;
    }
    Ok(status)
}

/// The next line of the input without its end; bytes that are no UTF-8 become replacement signs, which
/// no line may hold.
fn next_line(input: &mut impl BufRead) -> Result<Option<String>, Failure> {
    let broken = |error| FileError::Read {
        name: "standard input".to_owned(),
        error,
    };
    let mut bytes = Vec::new();
    let n = input.take(LONGEST).read_until(b'\n', &mut bytes);
    if n.map_err(broken)? == 0 {
        return Ok(None);
    }
    if bytes.last() != Some(&b'\n') {
        // the rest of an endless line
        input.skip_until(b'\n').map_err(broken)?;
    }
    let text = String::from_utf8_lossy(&bytes);
    Ok(Some(text.trim_end_matches(['\n', '\r']).to_owned()))
}

#[derive(Serialize)]
struct Answer<'a> {
    #[serde(rename = "in")]
    text: &'a str,
    canonical: Option<String>,
    status: Option<&'static str>,
    items: Vec<String>,
    notes: Vec<&'static str>,
    error: Option<ErrorJson<'a>>,
}

#[derive(Serialize)]
struct ErrorJson<'a> {
    code: &'static str,
    column: usize,
    text: &'a str,
}

impl<'a> Answer<'a> {
    fn new(text: &'a str, read: &'a Result<Line, LineError>) -> Answer<'a> {
        match read {
            Ok(line) => Answer {
                text,
                canonical: Some(line.to_string()),
                status: Some(line.status.name()),
                items: line.items.iter().map(line::Item::spelled).collect(),
                notes: line.notes.iter().map(line::Note::code).collect(),
                error: None,
            },
            Err(error) => Answer {
                text,
                canonical: None,
                status: None,
                items: Vec::new(),
                notes: Vec::new(),
                error: Some(ErrorJson {
                    code: error.code,
                    column: error.column,
                    text: &error.text,
                }),
            },
        }
    }
}
