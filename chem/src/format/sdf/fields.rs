//! Data fields of an SD record.

use super::super::lines::Lines;
use super::super::{Field, Notice};

/// What a line behind the molfile is.
enum Item<'a> {
    /// The header of a field.
    Header(&'a str, Option<&'a str>),
    /// A line of its value.
    Value(&'a str),
    /// The blank line that ends it, or one more.
    Blank,
    /// Text outside of any field.
    Stray(&'a str),
}

/// Goes through the lines of `data`, telling what each is; `line` is the number of the first.
fn walk<'a>(
    data: &'a str,
    line: usize,
    notices: &mut Vec<Notice>,
    mut visit: impl FnMut(Item<'a>),
) {
    let mut lines = Lines::new(data, line);
    let mut notice = |line, code, text: String| notices.push(Notice::new(line, code, text));
    let mut open = false;
    loop {
        let number = lines.number();
        let Some(line) = lines.next() else { break };
        let blank = line.trim().is_empty();
        if line.starts_with('>') && (!open || name(line).is_some()) {
            let name = name(line);
            if open {
                let text = "a blank line is missing before this data field".to_owned();
                notice(number, "field-end", text);
            }
            if name.is_none() {
                let text = "a data field without a name was kept".to_owned();
                notice(number, "field-name", text);
            }
            open = true;
            visit(Item::Header(line, name));
        } else if line.is_empty() || !open && blank {
            open = false;
            visit(Item::Blank);
        } else if blank && lines.peek().is_some_and(|l| l.starts_with('>')) {
            open = false;
            let text = "a line of blanks was taken for the blank line that ends a data field";
            notice(number, "field-end", text.to_owned());
            visit(Item::Blank);
        } else if open {
            visit(Item::Value(line));
        } else {
            let text = format!("a line outside of any data field: {}", line.trim_end());
            notice(number, "stray-line", text);
            visit(Item::Stray(line));
        }
    }
}

/// The data fields of a record, in order. `line` is the number of the first line of `data`.
pub fn fields(data: &str, line: usize, notices: &mut Vec<Notice>) -> Vec<Field> {
    let mut list: Vec<Field> = Vec::new();
    walk(data, line, notices, |item| match (item, list.last_mut()) {
        (Item::Header(header, name), _) => list.push(Field {
            header: header.to_owned(),
            name: name.unwrap_or_default().to_owned(),
            value: String::new(),
        }),
        (Item::Value(line), Some(field)) => {
            if !field.value.is_empty() {
                field.value.push('\n');
            }
            field.value.push_str(line);
        }
        _ => {}
    });
    list
}

/// The text of the data fields without those of some names; all other lines stay as they are. Lines end
/// with line feeds; a blank line ends the last field.
pub fn without(data: &str, names: &[&str]) -> String {
    let mut out = String::with_capacity(data.len());
    let mut keep = true;
    let mut push = |line: &str| {
        out.push_str(line);
        out.push('\n');
    };
    let mut ended = true;
    walk(data, 1, &mut Vec::new(), |item| match item {
        Item::Header(header, name) => {
            if keep && !ended {
                push("");
            }
            keep = name.is_none_or(|n| !names.contains(&n));
            ended = !keep;
            if keep {
                push(header);
            }
        }
        Item::Value(line) if keep => push(line),
        Item::Blank => {
            if keep {
                push("");
            }
            (keep, ended) = (true, true);
        }
        Item::Stray(line) => push(line),
        Item::Value(_) => {}
    });
    if keep && !ended {
        push("");
    }
    out
}

/// One data field as text, with the blank line that ends it.
pub fn field_text(name: &str, value: &str) -> String {
    let mut out = String::new();
    write(&Field::new(name, value), &mut out);
    out
}

/// The name between `<` and the last `>` of a header line.
fn name(header: &str) -> Option<&str> {
    let start = header.find('<')? + 1;
    let end = header.rfind('>')?;
    header.get(start..end)
}

/// A field with the blank line that ends it. What would break the file is kept from doing so: a blank
/// line within a value becomes one blank, a line `$$$$` gets one in front.
pub(super) fn write(field: &Field, out: &mut String) {
    let header = field.header.replace(['\n', '\r'], " ");
    if header.starts_with('>') {
        out.push_str(&header);
    } else {
        out.push_str("> <");
        out.push_str(&field.name.replace(['\n', '\r', '<', '>'], " "));
        out.push('>');
    }
    out.push('\n');
    if !field.value.is_empty() {
        for line in Lines::new(&field.value, 1) {
            if line.is_empty() || line.starts_with("$$$$") || starts_field(line) {
                out.push(' ');
            }
            out.push_str(line);
            out.push('\n');
        }
    }
    out.push('\n');
}

fn starts_field(line: &str) -> bool {
    line.starts_with('>') && name(line).is_some()
}
