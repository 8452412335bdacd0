//! One record of a file: a drawing with what stands around it.

use super::{Notice, StereoGroup};
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
    /// Lines that mean nothing to the drawing (S-groups and others), byte for byte, in the language of
    /// `version`. They name atoms and bonds by number. In V2000 they are property lines; in V3000 they
    /// stand behind the bonds, and where one is `M  V30 END CTAB`, those after it stand behind the table.
    pub extra: Vec<String>,
    /// The version it came in, and is written in again if that has room for it.
    pub version: Version,
    /// Which configurations are claimed, and how; empty if the file says nothing of it.
    pub stereo_groups: Vec<StereoGroup>,
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
            version: Version::V2000,
            stereo_groups: Vec::new(),
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

    /// The record with another drawing in place of its own. Extra lines and stereo groups stay if all
    /// atoms and bonds kept their numbers (new ones last); else they go, and a notice says which. Who
    /// knows where the atoms went gives the groups too: [`Record::with_drawing_and_groups`].
    #[must_use]
    pub fn with_drawing(mut self, drawing: Drawing) -> Record {
        let mut groups = std::mem::take(&mut self.stereo_groups);
        if !groups.is_empty() && !begins_with(drawing.molecule(), self.drawing.molecule()) {
            let text = format!(
                "atoms or bonds have other numbers now; stereo groups left out: {}",
                StereoGroup::list(&groups)
            );
            self.notices
                .push(Notice::new(0, "stereo-groups-dropped", text));
            groups.clear();
        }
        self.with_drawing_and_groups(drawing, groups)
    }

    /// The record with another drawing and with the stereo groups of that drawing. Extra lines stay or
    /// go as with [`Record::with_drawing`]; they also go, with a notice, if the record now needs a
    /// version in whose language they are not written.
    #[must_use]
    pub fn with_drawing_and_groups(
        mut self,
        drawing: Drawing,
        stereo_groups: Vec<StereoGroup>,
    ) -> Record {
        if !begins_with(drawing.molecule(), self.drawing.molecule()) {
            self.drop_extra("atoms or bonds have other numbers now");
        }
        self.drawing = drawing;
        self.stereo_groups = stereo_groups;
        let needed = self.needed_version();
        if needed != self.version {
            self.drop_extra("the record needs a V3000 molfile now, and these lines are of V2000");
            self.version = needed;
        }
        self
    }

    /// The version in which the record is written: the one it came in, but V3000 if it has stereo
    /// groups or more than 999 atoms or bonds, for which V2000 has no room.
    pub fn needed_version(&self) -> Version {
        let m = self.drawing.molecule();
        if m.n_atoms().max(m.n_bonds()) > 999 || !self.stereo_groups.is_empty() {
            Version::V3000
        } else {
            self.version
        }
    }

    fn drop_extra(&mut self, why: &str) {
        let lines = std::mem::take(&mut self.extra);
        if !lines.is_empty() {
            let text = format!("{why}; left out: {}", lines.join(" | "));
            self.notices
                .push(Notice::new(0, "properties-dropped", text));
        }
    }
}

/// The two forms of a molfile.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Default)]
pub enum Version {
    /// Fixed columns; at most 999 atoms and bonds.
    #[default]
    V2000,
    /// Words and blocks; also stereo groups.
    V3000,
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
    use super::super::GroupKind;
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
    fn stereo_groups_stay_only_where_their_numbers_do() {
        let chain = draw(
            &[("C", 0.0, 0.0), ("C", 1.0, 0.5), ("O", 2.0, 0.0)],
            &[(0, 1, 1, ' '), (1, 2, 1, 'w')],
        );
        let mut record = Record::new("x", chain.clone());
        record.extra.push("M  STY  1   1 DAT".to_owned());
        let groups = vec![StereoGroup {
            kind: GroupKind::Or(1),
            atoms: vec![AtomIx::new(1)],
        }];
        // lines of V2000 cannot stand beside groups
        let grouped = record.with_drawing_and_groups(chain.clone(), groups.clone());
        assert_eq!(grouped.version, Version::V3000);
        assert_eq!(grouped.notices[0].code, "properties-dropped");
        let same = grouped.clone().with_drawing(chain.clone());
        assert_eq!(same.stereo_groups, groups);
        let (less, map) = chain.apply(&[Edit::RemoveAtom(AtomIx::new(0))]).unwrap();
        let lost = grouped.clone().with_drawing(less.clone());
        assert!(lost.stereo_groups.is_empty());
        assert!(lost.notices[1].text.contains("or1 (atom 2)"));
        let moved = groups.iter().filter_map(|g| g.renumbered(&map)).collect();
        let followed = grouped.with_drawing_and_groups(less, moved);
        assert_eq!(followed.stereo_groups[0].atoms, [AtomIx::new(0)]);
        assert_eq!(followed.notices.len(), 1);
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
