//! `figure`: a drawing for print.

use super::{Failure, Status, say};
use crate::args::Figure;
use crate::figure::{self, Form, Options};
use crate::files::{self, Piece, Source, is_standard, name_of, same_file};
use chem::pipeline;
use chem::solve::require::Requirement;
use std::num::NonZeroUsize;

pub(super) fn run(args: &Figure) -> Result<Status, Failure> {
    let form = if is_standard(&args.out) {
        Form::Svg
    } else {
        Form::of(&args.out).map_err(|e| Failure::Arguments(e.to_string()))?
    };
    let mut source = Source::open(&args.file)?;
    if same_file(&args.file, &args.out) {
        return Err(Failure::Arguments(format!(
            "{}: a figure cannot take the place of its own input; give another name to -o",
            args.out.display()
        )));
    }
    let piece = choose(&mut source, args.record)?;
    let name = format!("{}: record {}", source.name, piece.number);
    let record = match piece.read() {
        Ok(record) => record,
        Err(error) => return Err(Failure::Arguments(format!("{name}, {error}"))),
    };
    for notice in &record.notices {
        say(&format!("{name}, {notice}"));
    }
    let report = pipeline::report(&record.drawing, &Requirement::default());
    let ink = figure::ink(&record.drawing, &report, args.style, args.descriptors);
    if let (None, Some(warning)) = (args.width, figure::too_wide(&ink, args.style)) {
        say(&warning);
    }
    let options = Options {
        form,
        style: args.style,
        width: args.width,
        dpi: args.dpi,
    };
    match figure::write(&ink, &record.title, &report, &options) {
        Ok(bytes) => {
            files::write(&args.out, &bytes)?;
            Ok(Status::Good)
        }
        Err(error) => {
            let out = name_of(&args.out, "standard output");
            say(&format!("{name}: {error}. {out} was not written"));
            Ok(Status::Wrong)
        }
    }
}

/// The record to draw: the one asked for, or the only one.
fn choose(source: &mut Source, wanted: Option<NonZeroUsize>) -> Result<Piece, Failure> {
    let mut found = None;
    let mut count = 0;
    while let Some(piece) = source.next_piece()? {
        count = piece.number;
        match wanted {
            Some(n) if n.get() != piece.number => {}
            Some(_) => return Ok(piece),
            None if found.is_some() => {
                return Err(Failure::Arguments(format!(
                    "{}: it holds more than one record; say which with --record N",
                    source.name
                )));
            }
            None => found = Some(piece),
        }
    }
    found.ok_or_else(|| {
        let wanted = wanted.map_or(1, NonZeroUsize::get);
        Failure::Arguments(format!(
            "{}: there is no record {wanted}; it holds {count}",
            source.name
        ))
    })
}
