//! What was typed on the command line.

use crate::export::POINTS_PER_MM;
use crate::figure::DPI;
use chem::ink::{STYLES, Style};
use clap::builder::{PossibleValue, PossibleValuesParser, TypedValueParser};
use clap::{Args as Group, Parser, Subcommand};
use std::num::NonZeroUsize;
use std::path::PathBuf;

/// Draws a molecule so that it carries exactly the stereodescriptors that were asked for.
///
/// Without a verb the window opens. Exit status: 0 all is good; 1 something is wrong or could not be
/// met; 2 unusable arguments or unreadable input.
#[derive(Debug, Parser)]
#[command(name = "wedgewright", version, args_conflicts_with_subcommands = true)]
pub struct Args {
    /// What to do without the window
    #[command(subcommand)]
    pub verb: Option<Verb>,
    /// A molfile or SD file to open in the window
    pub file: Option<PathBuf>,
}

/// What to do without the window.
#[derive(Debug, Subcommand)]
pub enum Verb {
    /// Tell what each drawing carries: record, title and labels such as '3R 7E 8E'
    Labels(Labels),
    /// Draw what is required: marks set, double bonds turned
    Place(Place),
    /// Tell what a reader could take wrongly in each drawing, and what would mend it
    Audit(Audit),
    /// Mend drawings: towards what is required, or, if nothing is, all that keeps their meaning
    Mend(Mend),
    /// Make a figure for print
    Figure(Figure),
    /// Read a requirement line and write it in its one canonical form
    Line(Line),
}

/// Arguments of `labels`.
#[derive(Debug, Group)]
pub struct Labels {
    /// Molfiles, SD files or files of line notation (SMILES and a name a line); - is standard input
    #[arg(required = true, value_name = "FILE")]
    pub files: Vec<PathBuf>,
    /// Write one JSON object a line, with every stereogenic place
    #[arg(long)]
    pub json: bool,
    /// How many records are worked on at once
    #[arg(long, value_name = "N")]
    pub threads: Option<NonZeroUsize>,
}

/// Arguments of `place`.
#[derive(Debug, Group)]
#[command(group(clap::ArgGroup::new("requirement").required(true).args(["carry", "carry_field"])))]
pub struct Place {
    /// A molfile or SD file; - is standard input
    #[arg(value_name = "FILE")]
    pub file: PathBuf,
    /// What every drawing must carry, such as '(1R,2S)', by atom numbers
    #[arg(long, value_name = "LINE")]
    pub carry: Option<String>,
    /// The data field that holds what the drawing of a record must carry
    #[arg(long, value_name = "NAME")]
    pub carry_field: Option<String>,
    /// Where to write; - is standard output
    #[arg(short, long, value_name = "OUT")]
    pub out: PathBuf,
    /// How many records are worked on at once
    #[arg(long, value_name = "N")]
    pub threads: Option<NonZeroUsize>,
}

/// Arguments of `audit`.
#[derive(Debug, Group)]
#[command(group(clap::ArgGroup::new("audit_requirement").args(["carry", "carry_field"])))]
pub struct Audit {
    /// Molfiles or SD files; - is standard input
    #[arg(required = true, value_name = "FILE")]
    pub files: Vec<PathBuf>,
    /// What every drawing must carry, such as '(1R,2S)', by atom numbers
    #[arg(long, value_name = "LINE")]
    pub carry: Option<String>,
    /// The data field that holds what the drawing of a record must carry
    #[arg(long, value_name = "NAME")]
    pub carry_field: Option<String>,
    /// Write one JSON object a line, with every finding, what it rests on and how to mend it
    #[arg(long)]
    pub json: bool,
    /// How many records are worked on at once
    #[arg(long, value_name = "N")]
    pub threads: Option<NonZeroUsize>,
}

/// Arguments of `mend`.
#[derive(Debug, Group)]
#[command(group(clap::ArgGroup::new("mend_requirement").args(["carry", "carry_field"])))]
pub struct Mend {
    /// A molfile or SD file; - is standard input
    #[arg(value_name = "FILE")]
    pub file: PathBuf,
    /// What every drawing must carry, such as '(1R,2S)', by atom numbers
    #[arg(long, value_name = "LINE")]
    pub carry: Option<String>,
    /// The data field that holds what the drawing of a record must carry
    #[arg(long, value_name = "NAME")]
    pub carry_field: Option<String>,
    /// Where to write; - is standard output
    #[arg(short, long, value_name = "OUT")]
    pub out: PathBuf,
    /// Where to write what was mended and why, one JSON object a line
    #[arg(long, value_name = "LOG")]
    pub log: Option<PathBuf>,
    /// How many records are worked on at once
    #[arg(long, value_name = "N")]
    pub threads: Option<NonZeroUsize>,
}

/// Arguments of `figure`.
#[derive(Debug, Group)]
pub struct Figure {
    /// A molfile or SD file; - is standard input
    #[arg(value_name = "FILE")]
    pub file: PathBuf,
    /// Where to write: a name that ends in .svg, .pdf or .png; - is standard output, as SVG
    #[arg(short, long, value_name = "OUT")]
    pub out: PathBuf,
    /// Which record of a file that holds several
    #[arg(long, value_name = "N")]
    pub record: Option<NonZeroUsize>,
    /// Measures for the place of print
    #[arg(long, value_name = "STYLE", value_parser = styles(), default_value = STYLES[0].name)]
    pub style: &'static Style,
    /// Width of the figure, such as 84mm, 3.25in, 240pt
    #[arg(long, value_name = "WIDTH", value_parser = length)]
    pub width: Option<f64>,
    /// Dots per inch of a PNG
    #[arg(long, value_name = "DPI", default_value_t = DPI)]
    pub dpi: f64,
    /// Write locants and descriptors beside their places
    #[arg(long)]
    pub descriptors: bool,
}

/// Arguments of `line`.
#[derive(Debug, Group)]
pub struct Line {
    /// The line, such as '(1R,2S)'; - reads lines from standard input
    #[arg(value_name = "LINE")]
    pub text: String,
    /// Write one JSON object for each line
    #[arg(long)]
    pub json: bool,
}

/// The styles by their names, each with the source of its measures.
fn styles() -> impl TypedValueParser<Value = &'static Style> {
    let names = STYLES
        .each_ref()
        .map(|s| PossibleValue::new(s.name).help(s.source));
    PossibleValuesParser::new(names)
        .try_map(|name| Style::named(&name).ok_or("there is no such style"))
}

/// A length with its unit, in points.
fn length(text: &str) -> Result<f64, String> {
    let units = [
        ("mm", POINTS_PER_MM),
        ("cm", 10.0 * POINTS_PER_MM),
        ("in", 72.0),
        ("pt", 1.0),
    ];
    let parsed = units.iter().find_map(|(unit, points)| {
        let number: f64 = text.strip_suffix(unit)?.trim().parse().ok()?;
        Some(number * points)
    });
    match parsed {
        Some(points) if points.is_finite() && points > 0.0 => Ok(points),
        Some(_) => Err("a length must be greater than 0".to_owned()),
        None => Err("write a number and a unit: mm, cm, in or pt".to_owned()),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use clap::CommandFactory;

    #[test]
    fn the_arguments_are_consistent() {
        Args::command().debug_assert();
    }

    #[test]
    fn lengths_have_units() {
        assert_eq!(length("72pt"), Ok(72.0));
        assert_eq!(length("1 in"), Ok(72.0));
        assert!((length("84mm").unwrap() - 238.11).abs() < 0.01);
        for text in ["84", "mm", "-3mm", "0cm", "nan mm", "inf pt", "84 furlongs"] {
            assert!(length(text).is_err(), "{text}");
        }
    }

    #[test]
    fn place_wants_one_requirement() {
        let parse = |words: &[&str]| Args::try_parse_from(words);
        assert!(parse(&["w", "place", "a", "-o", "b"]).is_err());
        assert!(
            parse(&[
                "w",
                "place",
                "a",
                "-o",
                "b",
                "--carry",
                "1R",
                "--carry-field",
                "X"
            ])
            .is_err()
        );
        assert!(parse(&["w", "place", "-", "-o", "-", "--carry", "1R"]).is_ok());
        assert!(parse(&["w", "labels"]).is_err());
        assert!(parse(&["w"]).is_ok_and(|a| a.verb.is_none() && a.file.is_none()));
        assert!(parse(&["w", "a.mol"]).is_ok_and(|a| a.file.is_some()));
    }
}
