//! One record of a file: a drawing with what stands around it.

use super::Notice;
use crate::drawing::Drawing;
use crate::molecule::Molecule;

/// One molfile, or one record of an SD file.
#[derive(Clone, Debug)]
pub struct Record {
    /// First header line: the name.
    pub title: String,
    /// Second header line: who wrote it, when.
    pub program_line: String,
    /// Third header line: a comment.
    pub comment: String,
    /// The drawing.
    pub drawing: Drawing,
    /// Data fields of an SD record, in order.
    pub fields: Vec<Field>,
    /// Property lines that mean nothing to the drawing (S-groups and others), byte for byte. They name
    /// atoms and bonds by number.
    pub extra: Vec<String>,
    /// The chiral flag of the counts line: set for "this enantiomer", else relative or unstated. It is
    /// kept and never acted on.
    pub chiral_flag: bool,
    /// What was repaired or should be known.
    pub notices: Vec<Notice>,
}

impl Record {
    /// A record that holds a drawing and a name.
    pub fn new(title: &str, drawing: Drawing) -> Record {
        Record {
            title: title.to_owned(),
            program_line: String::new(),
            comment: String::new(),
            drawing,
            fields: Vec::new(),
            extra: Vec::new(),
            chiral_flag: false,
            notices: Vec::new(),
        }
    }

    /// Value of the first data field with this name.
    pub fn field(&self, name: &str) -> Option<&str> {
        self.fields
            .iter()
            .find(|f| f.name == name)
            .map(|f| f.value.as_str())
    }

    /// Sets a data field: the first one with this name, else a new one at the end.
    pub fn set_field(&mut self, name: &str, value: &str) {
        match self.fields.iter_mut().find(|f| f.name == name) {
            Some(field) => value.clone_into(&mut field.value),
            None => self.fields.push(Field::new(name, value)),
        }
    }

    /// The record with another drawing in place of its own. The extra property lines stay if all atoms
    /// and bonds kept their numbers (new ones last); else they go, and a notice says which.
    #[must_use]
    pub fn with_drawing(mut self, drawing: Drawing) -> Record {
        if !self.extra.is_empty() && !begins_with(drawing.molecule(), self.drawing.molecule()) {
            let lines = std::mem::take(&mut self.extra);
            self.notices.push(Notice::new(
                0,
                "properties-dropped",
                format!(
                    "atoms or bonds have other numbers now; left out: {}",
                    lines.join(" | ")
                ),
            ));
        }
        self.drawing = drawing;
        self
    }
}

/// Whether the atoms and bonds of `before` are the first ones of `after`, under the same numbers.
fn begins_with(after: &Molecule, before: &Molecule) -> bool {
    let same_atoms = before.n_atoms() <= after.n_atoms()
        && before
            .atoms()
            .all(|a| before.element(a) == after.element(a));
    let same_bonds = before.n_bonds() <= after.n_bonds()
        && before.bonds().all(|b| {
            let ([a, c], [d, e]) = (before.bond(b).ends, after.bond(b).ends);
            (a, c) == (d, e) || (a, c) == (e, d)
        });
    same_atoms && same_bonds
}

/// One data field of an SD record.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Field {
    /// Its header line as it stands in the file (`> <NAME>`).
    pub header: String,
    /// The name between `<` and `>`; empty if there is none.
    pub name: String,
    /// Its lines, joined by line feeds.
    pub value: String,
}

impl Field {
    /// A field with the plain header `> <NAME>`.
    pub fn new(name: &str, value: &str) -> Field {
        Field {
            header: format!("> <{name}>"),
            name: name.to_owned(),
            value: value.to_owned(),
        }
    }
}

/// How a record is written.
#[derive(Clone, Debug, Default)]
pub struct WriteOptions {
    /// Date and time for the second header line, `MMDDYYHHmm`; blank if there is none. (The chemistry
    /// has no clock.)
    pub date: Option<String>,
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::drawing::Edit;
    use crate::drawing::tests::draw;
    use crate::molecule::AtomIx;

    #[test]
    fn extra_lines_go_when_numbers_change() {
        let chain = || {
            draw(
                &[("C", 0.0, 0.0), ("C", 1.0, 0.5), ("O", 2.0, 0.0)],
                &[(0, 1, 1, ' '), (1, 2, 1, 'w')],
            )
        };
        let mut record = Record::new("x", chain());
        record.extra.push("M  STY  1   1 DAT".to_owned());
        let same = record.clone().with_drawing(chain());
        assert_eq!((same.extra.len(), same.notices.len()), (1, 0));
        let (less, _) = chain().apply(&[Edit::RemoveAtom(AtomIx::new(0))]).unwrap();
        let changed = record.with_drawing(less);
        assert!(changed.extra.is_empty());
        assert!(changed.notices[0].text.contains("M  STY"));
    }

    #[test]
    fn fields_are_set_in_place() {
        let mut record = Record::new("x", Drawing::empty());
        record.set_field("A", "1");
        record.set_field("B", "2");
        record.set_field("A", "3");
        assert_eq!(record.field("A"), Some("3"));
        assert_eq!(record.fields.len(), 2);
        assert_eq!(record.field("C"), None);
    }
}
