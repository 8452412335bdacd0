//! The writers on small figures.

use super::*;
use chem::drawing::{Drawing, End, Mark};
use chem::element::Element;
use chem::ink::{Caption, STYLES, Tone, compose};
use chem::molecule::{Atom, AtomIx, Bond, Molecule, Order};
use std::process::Command;

/// A zwitterion with wedge, charges, subscripts and a caption.
fn figure() -> Ink {
    let atom = |element, charge| {
        let mut atom = Atom::new(element);
        atom.charge = charge;
        atom
    };
    let atoms = vec![
        atom(Element::C, 0),
        atom(Element::C, 0),
        atom(Element::N, 1),
        atom(Element::C, 0),
        atom(Element::O, 0),
        atom(Element::O, -1),
    ];
    let bond = |a: usize, b: usize, order| Bond {
        ends: [AtomIx::new(a), AtomIx::new(b)],
        order,
    };
    let bonds = vec![
        bond(1, 0, Order::Single),
        bond(1, 2, Order::Single),
        bond(1, 3, Order::Single),
        bond(3, 4, Order::Double),
        bond(3, 5, Order::Single),
    ];
    let points = [
        (-0.87, -0.5),
        (0.0, 0.0),
        (0.0, 1.0),
        (0.87, -0.5),
        (0.87, -1.5),
        (1.73, 0.0),
    ]
    .map(kurbo::Point::from);
    let marks = vec![
        Mark::Plain,
        Mark::Hashed(End::First),
        Mark::Plain,
        Mark::Plain,
        Mark::Plain,
    ];
    let molecule = Molecule::new(atoms, bonds).unwrap();
    let drawing = Drawing::new(molecule, points.to_vec(), marks).unwrap();
    let caption = Caption {
        atoms: vec![AtomIx::new(1)],
        locant: "2".to_owned(),
        descriptor: Some("R".to_owned()),
        tone: Tone::Agrees,
    };
    compose(&drawing, &STYLES[0], &[caption], None)
}

fn facts() -> Facts {
    Facts {
        title: "Lot KX-7 <rev. B>".to_owned(),
        description: "2R, \"free\" amino acid & salt".to_owned(),
        keywords: vec!["2R".to_owned()],
        creator: "Wedgewright".to_owned(),
        date: Some(Date {
            year: 2031,
            month: 2,
            day: 3,
            hour: 4,
            minute: 5,
            second: 6,
        }),
    }
}

#[test]
fn the_page_is_the_ink_with_its_margin_or_as_wide_as_asked() {
    let (ink, facts) = (figure(), facts());
    let own = Sheet::fit(&ink, 3.0, None, &facts).unwrap();
    assert!((own.width - ink.bounds.width() - 6.0).abs() < 1e-9);
    let corner = ink.bounds.origin() + own.offset;
    assert!(corner.distance(kurbo::Point::new(3.0, 3.0)) < 1e-9);
    let asked = 84.0 * POINTS_PER_MM;
    let wide = Sheet::fit(&ink, 3.0, Some(asked), &facts).unwrap();
    assert!((wide.width - asked).abs() < 1e-12);
    let middle = ink.bounds.center() + wide.offset;
    assert!((middle.x - 0.5 * asked).abs() < 1e-9);
    assert!((wide.height - own.height).abs() < 1e-12);
}

#[test]
fn a_figure_that_does_not_fit_is_an_error_that_names_a_width_that_would() {
    let (ink, facts) = (figure(), facts());
    let error = Sheet::fit(&ink, 3.0, Some(20.0), &facts).unwrap_err();
    let needed = ink.bounds.width();
    assert_eq!(
        error,
        SheetError::TooWide {
            needed,
            asked: 20.0
        }
    );
    let text = error.to_string();
    let named: f64 = text.split_whitespace().nth(3).unwrap().parse().unwrap();
    assert!(Sheet::fit(&ink, 3.0, Some(named * POINTS_PER_MM), &facts).is_ok());
    for bad in [f64::NAN, -1.0, 0.0, f64::INFINITY] {
        assert!(matches!(
            Sheet::fit(&ink, 3.0, Some(bad), &facts),
            Err(SheetError::NoSize(_))
        ));
    }
    assert!(Sheet::fit(&ink, f64::NAN, None, &facts).is_err());
}

/// Fails unless every element is closed in turn, attributes are quoted and no bare `&` or `<` stands.
/// Returns the names of the elements.
fn well_formed(xml: &str) -> Vec<String> {
    let (mut open, mut names) = (Vec::new(), Vec::new());
    let mut rest = xml;
    while let Some(at) = rest.find('<') {
        assert!(!rest[..at].contains('>'), "stray >");
        let text = rest[..at].replace("&amp;", "").replace("&lt;", "");
        let text = text.replace("&gt;", "").replace("&quot;", "");
        assert!(!text.contains('&'), "{text}");
        let end = at + rest[at..].find('>').expect("an open tag");
        let tag = &rest[at + 1..end];
        rest = &rest[end + 1..];
        if tag.starts_with('?') {
            continue;
        }
        assert_eq!(tag.matches('"').count() % 2, 0, "{tag}");
        let name = tag
            .trim_start_matches('/')
            .split([' ', '/'])
            .next()
            .unwrap();
        if tag.starts_with('/') {
            assert_eq!(open.pop().as_deref(), Some(name));
        } else {
            names.push(name.to_owned());
            if !tag.ends_with('/') {
                open.push(name.to_owned());
            }
        }
    }
    assert!(open.is_empty());
    names
}

#[test]
fn svg_is_well_formed_and_has_its_size_in_millimetres() {
    let (ink, facts) = (figure(), facts());
    let sheet = Sheet::fit(&ink, 3.0, Some(84.0 * POINTS_PER_MM), &facts).unwrap();
    let outlines = svg::write(&sheet, svg::TextAs::Outlines);
    let names = well_formed(&outlines);
    assert!(outlines.contains(r#" width="84mm""#) && outlines.contains(r#"role="img""#));
    assert!(outlines.contains(r#"viewBox="0 0 238.11 "#), "{outlines}");
    assert!(outlines.contains("Lot KX-7 &lt;rev. B&gt;</title>"));
    assert!(!names.contains(&"text".to_owned()));
    let text = svg::write(&sheet, svg::TextAs::Text);
    let names = well_formed(&text);
    // a label is one text: NH3+, O, O−, 2R
    assert_eq!(names.iter().filter(|n| *n == "text").count(), 4);
    assert!(text.contains(r#"font-style="italic">R</tspan>"#));
    let empty = Facts::default();
    let bare = svg::write(
        &Sheet::fit(&ink, 0.0, None, &empty).unwrap(),
        svg::TextAs::Text,
    );
    assert!(!well_formed(&bare).contains(&"title".to_owned()));
}

#[test]
fn png_has_exactly_the_pixels_and_the_physical_size_asked_for() {
    let (ink, facts) = (figure(), facts());
    let sheet = Sheet::fit(&ink, 3.0, Some(84.0 * POINTS_PER_MM), &facts).unwrap();
    // 84 mm are 992.1 and 3968.5 pixels
    for (dpi, width, per_metre) in [(300.0, 992, 11811), (1200.0, 3969, 47244)] {
        let bytes = png::write(&sheet, dpi, png::Depth::Grey).unwrap();
        let decoder = ::png::Decoder::new(std::io::Cursor::new(bytes));
        let mut reader = decoder.read_info().unwrap();
        let mut data = vec![0; reader.output_buffer_size().unwrap()];
        reader.next_frame(&mut data).unwrap();
        let info = reader.info();
        assert_eq!(info.width, width);
        assert!((f64::from(info.height) - sheet.height * dpi / 72.0).abs() <= 0.5);
        let dims = info.pixel_dims.unwrap();
        assert_eq!((dims.xppu, dims.yppu), (per_metre, per_metre));
        assert_eq!(dims.unit, ::png::Unit::Meter);
        assert_eq!(info.color_type, ::png::ColorType::Grayscale);
        assert!(data.contains(&0) && data[0] == 255 && data[data.len() - 1] == 255);
        let title = info.uncompressed_latin1_text.iter();
        assert!(
            title
                .clone()
                .any(|t| t.keyword == "Title" && t.text == facts.title)
        );
    }
}

#[test]
fn png_in_two_levels_shows_the_same_figure() {
    let (ink, facts) = (figure(), facts());
    let sheet = Sheet::fit(&ink, 3.0, None, &facts).unwrap();
    let dark = |depth| {
        let bytes = png::write(&sheet, 400.0, depth).unwrap();
        let mut decoder = ::png::Decoder::new(std::io::Cursor::new(bytes));
        decoder.set_transformations(::png::Transformations::EXPAND);
        let mut reader = decoder.read_info().unwrap();
        let mut data = vec![0; reader.output_buffer_size().unwrap()];
        reader.next_frame(&mut data).unwrap();
        data.iter().map(|v| *v < 128).collect::<Vec<bool>>()
    };
    assert_eq!(dark(png::Depth::Grey), dark(png::Depth::BlackWhite));
}

#[test]
fn png_refuses_what_it_cannot_make() {
    let (ink, facts) = (figure(), facts());
    let sheet = Sheet::fit(&ink, 3.0, Some(5000.0), &facts).unwrap();
    for dpi in [0.0, -5.0, f64::NAN, 1e9] {
        assert!(matches!(
            png::write(&sheet, dpi, png::Depth::Grey),
            Err(png::PngError::Resolution(_))
        ));
    }
    assert!(matches!(
        png::write(&sheet, 10_000.0, png::Depth::Grey),
        Err(png::PngError::TooLarge { .. })
    ));
}

/// What a program says of a file, if the program is there.
fn ask(program: &str, after: &[&str], pdf: &[u8]) -> Option<String> {
    let dir = tempfile::tempdir().unwrap();
    let path = dir.path().join("figure.pdf");
    std::fs::write(&path, pdf).unwrap();
    let output = Command::new(program).arg(&path).args(after).output().ok()?;
    assert!(output.status.success(), "{program}: {output:?}");
    Some(String::from_utf8_lossy(&output.stdout).into_owned())
}

#[test]
fn pdf_has_exactly_the_page_and_gives_its_labels_as_words() {
    let (ink, facts) = (figure(), facts());
    let sheet = Sheet::fit(&ink, 3.0, Some(240.0), &facts).unwrap();
    let bytes = pdf::write(&sheet).unwrap();
    assert!(bytes.starts_with(b"%PDF-1."));
    assert_eq!(bytes, pdf::write(&sheet).unwrap());
    if let Some(text) = ask("pdftotext", &["-"], &bytes) {
        let words: Vec<&str> = text.split_whitespace().collect();
        for word in ["NH3+", "O", "O−", "2R"] {
            assert!(words.contains(&word), "{word} in {words:?}");
        }
    }
    if let Some(info) = ask("pdfinfo", &[], &bytes) {
        let height = format!("{:.6}", sheet.height);
        let page = info.lines().find(|l| l.starts_with("Page size")).unwrap();
        assert!(
            page.contains(" 240 x ") && page.contains(&height[..5]),
            "{page} {height}"
        );
        assert!(
            info.contains(&facts.title) && info.contains("2031"),
            "{info}"
        );
    }
}

#[test]
fn pdf_of_nothing_opens_and_one_of_a_wall_is_refused() {
    let (empty, facts) = (compose(&Drawing::empty(), &STYLES[0], &[], None), facts());
    let sheet = Sheet::fit(&empty, 0.0, None, &facts).unwrap();
    assert!(pdf::write(&sheet).is_ok());
    assert!(png::write(&sheet, 300.0, png::Depth::Grey).is_ok());
    well_formed(&svg::write(&sheet, svg::TextAs::Outlines));
    let wall = Sheet::fit(&empty, 0.0, Some(20_000.0), &facts).unwrap();
    assert_eq!(pdf::write(&wall).err(), Some(pdf::PdfError::PageSize));
}
