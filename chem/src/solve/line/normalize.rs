//! The typed line in the few characters that the grammar knows, each with its column.
//!
//! Own rules throughout: names are pasted from papers and web pages, with their typography.

use super::report::LineError;
use unicode_normalization::UnicodeNormalization;

/// The most characters in a line.
pub(super) const MOST_CHARACTERS: usize = 2_000;

/// A line in plain characters, and the way back to the columns as typed.
#[derive(Debug)]
pub(super) struct Text {
    /// The characters.
    pub(super) chars: Vec<char>,
    columns: Vec<usize>,
    end: usize,
}

impl Text {
    /// Column of the character at `index`, or the one behind the line.
    pub(super) fn column(&self, index: usize) -> usize {
        self.columns.get(index).copied().unwrap_or(self.end)
    }

    fn push(&mut self, c: char, column: usize) {
        self.chars.push(c);
        self.columns.push(column);
    }
}

/// Tags of markup that are dropped.
const TAGS: [&str; 6] = ["i", "em", "b", "sub", "sup", "span"];

/// What a tag found at the start of a slice does.
struct Tag {
    length: usize,
    name: &'static str,
    closing: bool,
}

fn tag(typed: &[char]) -> Option<Tag> {
    let mut rest = typed.strip_prefix(&['<'])?;
    let closing = rest.first() == Some(&'/');
    if closing {
        rest = rest.get(1..)?;
    }
    let letters = rest
        .iter()
        .take_while(|c| c.is_ascii_alphanumeric())
        .count();
    let word: String = rest
        .iter()
        .take(letters)
        .collect::<String>()
        .to_ascii_lowercase();
    let name = TAGS.into_iter().find(|t| *t == word)?;
    let attributes = rest.get(letters..)?;
    let close = attributes.iter().position(|c| matches!(c, '<' | '>'))?;
    let spaced = close == 0
        || attributes
            .first()
            .is_some_and(|c| c.is_whitespace() || *c == '/');
    (attributes.get(close) == Some(&'>') && spaced).then_some(Tag {
        length: 1 + usize::from(closing) + letters + close + 1,
        name,
        closing,
    })
}

/// The spelling of characters that compatibility forms do not cover.
fn spelling(c: char) -> Option<&'static str> {
    Some(match c {
        '\u{2010}'..='\u{2015}' | '\u{2212}' | '\u{2043}' => "-",
        '\u{2032}' | '\u{2035}' | '\u{2018}' | '\u{2019}' | '\u{02BC}' | '\u{02B9}'
        | '\u{02CA}' | '\u{00B4}' | '`' => "'",
        '\u{2033}' | '\u{201C}' | '\u{201D}' | '\u{02BA}' | '"' => "''",
        '\u{2034}' => "'''",
        '\u{2057}' => "''''",
        '\u{00A0}'
        | '\u{1680}'
        | '\u{2000}'..='\u{200A}'
        | '\u{202F}'
        | '\u{205F}'
        | '\u{3000}' => " ",
        'ₐ' => "_a",
        'ₚ' => "_p",
        'ξ' => "Ξ",
        '\u{2044}' | '\u{2215}' => "/",
        '\u{2217}' | '\u{204E}' => "*",
        'ᴅ' => "D",
        'ʟ' => "L",
        '\u{3001}' => ",",
        _ => return None,
    })
}

fn superscript(c: char) -> Option<char> {
    let value = match c {
        '⁰' => 0,
        '¹' => 1,
        '²' => 2,
        '³' => 3,
        '⁴'..='⁹' => u32::from(c) - u32::from('⁴') + 4,
        _ => return None,
    };
    char::from_digit(value, 10)
}

/// Characters that cannot be seen.
fn invisible(c: char) -> bool {
    c.is_control()
        || matches!(c, '\u{00AD}' | '\u{061C}' | '\u{180E}' | '\u{200B}'..='\u{200F}' | '\u{2028}'..='\u{202E}'
            | '\u{2060}'..='\u{206F}' | '\u{FEFF}' | '\u{FFF9}'..='\u{FFFB}' | '\u{E0000}'..='\u{E007F}')
}

/// The Latin letter that a Cyrillic or capital Greek letter looks like, of those that the grammar uses.
fn looks_like(c: char) -> Option<char> {
    Some(match c {
        'Α' | 'А' => 'A',
        'Β' | 'В' => 'B',
        'С' => 'C',
        'Ε' | 'Е' => 'E',
        'Μ' | 'М' => 'M',
        'Ν' => 'N',
        'Ο' | 'О' => 'O',
        'Ρ' | 'Р' => 'P',
        'Ѕ' => 'S',
        'Τ' | 'Т' => 'T',
        'Ζ' => 'Z',
        'а' => 'a',
        'с' => 'c',
        'е' => 'e',
        'і' => 'i',
        'м' => 'm',
        'ο' | 'о' => 'o',
        'р' => 'p',
        'г' => 'r',
        'ѕ' => 's',
        'х' => 'x',
        _ => return None,
    })
}

/// The characters one typed character stands for.
fn plain(c: char) -> Vec<char> {
    if let Some(text) = spelling(c) {
        return text.chars().collect();
    }
    std::iter::once(c)
        .nfkc()
        .flat_map(|n| match spelling(n) {
            Some(text) => text.chars().collect::<Vec<_>>(),
            None => vec![n],
        })
        .collect()
}

/// Brings a line into plain characters.
///
/// # Errors
/// `E-LIMIT`, `E-CONTROL` and `E-LOOKALIKE`.
pub(super) fn normalize(typed: &str) -> Result<Text, LineError> {
    let typed: Vec<char> = typed.chars().take(MOST_CHARACTERS + 1).collect();
    if typed.len() > MOST_CHARACTERS {
        return Err(too_long());
    }
    let mut text = Text {
        chars: Vec::with_capacity(typed.len()),
        columns: Vec::with_capacity(typed.len()),
        end: typed.len() + 1,
    };
    let mut index = 0;
    let mut script = None;
    let mut raised = false;
    while let Some(&c) = typed.get(index) {
        let column = index + 1;
        if let Some(found) = typed.get(index..).and_then(tag) {
            script = match found.name {
                _ if found.closing => None,
                "sup" => Some('^'),
                "sub" => Some('_'),
                _ => script,
            };
            index += found.length;
            continue;
        }
        index += 1;
        refuse(c, column)?;
        if let Some(digit) = superscript(c) {
            if !raised {
                text.push('^', column);
            }
            text.push(digit, column);
            raised = true;
            continue;
        }
        raised = false;
        for n in plain(c) {
            refuse(n, column)?;
            mark_script(&mut text, script.take(), n, column);
            text.push(n, column);
        }
        // a single character may stand for many
        if text.chars.len() > 2 * MOST_CHARACTERS {
            return Err(too_long());
        }
    }
    Ok(join_plus_minus(text))
}

fn too_long() -> LineError {
    LineError::whole(
        "E-LIMIT",
        format!("the line is longer than {MOST_CHARACTERS} characters: shorten it"),
    )
}

fn refuse(c: char, column: usize) -> Result<(), LineError> {
    if invisible(c) {
        return Err(LineError::new(
            "E-CONTROL",
            column,
            format!(
                "an invisible character (U+{:04X}) stands here: delete it and type the place again",
                u32::from(c)
            ),
        ));
    }
    match looks_like(c) {
        Some(latin) => Err(LineError::new(
            "E-LOOKALIKE",
            column,
            format!(
                "'{c}' is not the Latin letter {latin}, though it looks like it: type {latin} on a Latin keyboard"
            ),
        )),
        None => Ok(()),
    }
}

/// Keeps what a tag says by position alone: 1<sup>2</sup> is not 12, nor is R<sub>S</sub> the racemate
/// mark RS.
fn mark_script(text: &mut Text, script: Option<char>, c: char, column: usize) {
    let Some(before) = text.chars.last().copied() else {
        return;
    };
    match script {
        Some('^') if c.is_ascii_digit() && before.is_ascii_alphanumeric() => text.push('^', column),
        Some('_') if c.is_ascii_alphabetic() && matches!(before, 'R' | 'S' | 'r' | 's') => {
            text.push('_', column);
        }
        _ => {}
    }
}

/// `+/-` is one sign.
fn join_plus_minus(text: Text) -> Text {
    let mut joined = Text {
        chars: Vec::with_capacity(text.chars.len()),
        columns: Vec::with_capacity(text.chars.len()),
        end: text.end,
    };
    let mut index = 0;
    while let Some(&c) = text.chars.get(index) {
        let sign = text.chars.get(index..index + 3) == Some(&['+', '/', '-']);
        joined.push(if sign { '±' } else { c }, text.column(index));
        index += if sign { 3 } else { 1 };
    }
    joined
}
