//! Data fields of an SD record.

use super::super::lines::Lines;
use super::super::{Field, Notice};

/// The data fields of a record, in order. `line` is the number of the first line of `data`.
pub fn fields(data: &str, line: usize, notices: &mut Vec<Notice>) -> Vec<Field> {
    let mut list: Vec<Field> = Vec::new();
    let mut lines = Lines::new(data, line);
    let mut open = false;
    loop {
        let number = lines.number();
        let Some(line) = lines.next() else { break };
        let is_header = line.starts_with('>') && (!open || name(line).is_some());
        if is_header {
            if open {
                notices.push(Notice::new(
                    number,
                    "field-end",
                    "a blank line is missing before this data field".to_owned(),
                ));
            }
            if name(line).is_none() {
                notices.push(Notice::new(
                    number,
                    "field-name",
                    "a data field without a name was kept".to_owned(),
                ));
            }
            list.push(Field {
                header: line.to_owned(),
                name: name(line).unwrap_or_default().to_owned(),
                value: String::new(),
            });
            open = true;
        } else if line.is_empty() {
            open = false;
        } else if open && line.trim().is_empty() && lines.peek().is_some_and(|l| l.starts_with('>'))
        {
            open = false;
            notices.push(Notice::new(
                number,
                "field-end",
                "a line of blanks was taken for the blank line that ends a data field".to_owned(),
            ));
        } else if let (true, Some(field)) = (open, list.last_mut()) {
            if !field.value.is_empty() {
                field.value.push('\n');
            }
            field.value.push_str(line);
        } else if !line.trim().is_empty() {
            notices.push(Notice::new(
                number,
                "stray-line",
                format!(
                    "a line outside of any data field was left out: {}",
                    line.trim_end()
                ),
            ));
        }
    }
    list
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
