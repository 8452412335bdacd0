//! `figure`: a drawing for print.

use super::{Failure, Status, say};
use crate::args::Figure;
use crate::export::png::Depth;
use crate::export::svg::TextAs;
use crate::export::{Facts, POINTS_PER_MM, Sheet, pdf, png, svg};
use crate::files::{self, Piece, Source, is_standard, name_of, same_file};
use chem::format::Record;
use chem::ink::{Caption, STYLES, Style, Tone, compose};
use chem::pipeline::{self, Report};
use chem::solve::require::Requirement;
use std::num::NonZeroUsize;
use std::path::Path;

/// Formats of figures, told by the name of the file to write: there is no content yet.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Form {
    Svg,
    Pdf,
    Png,
}

pub(super) fn run(args: &Figure) -> Result<Status, Failure> {
    let form = form(&args.out)?;
    let style = Style::named(args.style.name())
        .or(STYLES.first())
        .ok_or_else(|| Failure::Arguments("there are no styles".to_owned()))?;
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
    match figure(&record, style, form, args) {
        Ok(bytes) => {
            files::write(&args.out, &bytes)?;
            Ok(Status::Good)
        }
        Err(text) => {
            let out = name_of(&args.out, "standard output");
            say(&format!("{name}: {text}. {out} was not written"));
            Ok(Status::Wrong)
        }
    }
}

fn form(out: &Path) -> Result<Form, Failure> {
    if is_standard(out) {
        return Ok(Form::Svg);
    }
    let ending = out.extension().map(|e| e.to_ascii_lowercase());
    let forms = [("svg", Form::Svg), ("pdf", Form::Pdf), ("png", Form::Png)];
    let found = forms
        .iter()
        .find(|(name, _)| ending.as_ref().is_some_and(|e| e == name));
    found.map(|(_, form)| *form).ok_or_else(|| {
        Failure::Arguments(format!(
            "{}: the name must end in .svg, .pdf or .png to tell the format",
            out.display()
        ))
    })
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

fn figure(record: &Record, style: &Style, form: Form, args: &Figure) -> Result<Vec<u8>, String> {
    let report = pipeline::report(&record.drawing, &Requirement::default());
    let captions = if args.descriptors {
        captions(&report)
    } else {
        Vec::new()
    };
    let ink = compose(&record.drawing, style, &captions, None);
    if let (None, Some(limit)) = (args.width, style.width_limit)
        && ink.bounds.width() > limit
    {
        say(&format!(
            "the figure is {:.1} mm wide, more than the {:.1} mm that the style {} has room for",
            ink.bounds.width() / POINTS_PER_MM,
            limit / POINTS_PER_MM,
            style.name
        ));
    }
    let labels = report.labels_line();
    let facts = Facts {
        title: record.title.trim().to_owned(),
        description: if labels.is_empty() {
            "a molecule; its drawing carries no stereodescriptors".to_owned()
        } else {
            format!("a molecule; its drawing carries, by atom numbers: {labels}")
        },
        creator: concat!("Wedgewright ", env!("CARGO_PKG_VERSION")).to_owned(),
        ..Facts::default()
    };
    let sheet =
        Sheet::fit(&ink, style.page_margin, args.width, &facts).map_err(|e| e.to_string())?;
    match form {
        Form::Svg => Ok(svg::write(&sheet, TextAs::Outlines).into_bytes()),
        Form::Pdf => pdf::write(&sheet).map_err(|e| e.to_string()),
        Form::Png => {
            // offices that ask for patent drawings ask for black and white
            let depth = match style.name {
                "patent" => Depth::BlackWhite,
                _ => Depth::Grey,
            };
            png::write(&sheet, args.dpi, depth).map_err(|e| e.to_string())
        }
    }
}

/// Locant and descriptor of each place that carries one; a double bond by its lower atom.
fn captions(report: &Report) -> Vec<Caption> {
    let caption = |place: &pipeline::Place| {
        Some(Caption {
            locant: (place.atoms.iter().min()?.index() + 1).to_string(),
            descriptor: Some(place.carries?.to_string()),
            atoms: place.atoms.clone(),
            tone: Tone::Ink,
        })
    };
    report.places.iter().filter_map(caption).collect()
}
