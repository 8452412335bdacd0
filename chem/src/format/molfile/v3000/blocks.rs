//! A V3000 table parted into its blocks.

use super::super::super::lines::Lines;
use super::super::super::{Notice, ReadError, Reason};
use super::lines::{self, Entry, Item};
use super::{missing, whole};

/// Blocks that stand in a table itself, never in another of its blocks.
const OWN: [&str; 5] = ["ATOM", "BOND", "SGROUP", "COLLECTION", "OBJ3D"];

/// Blocks inside of each other that are told apart; deeper ones are lines like others, so that the work
/// stays in bounds.
pub(super) const DEEPEST: usize = 32;

/// A table, not understood yet.
#[derive(Debug, Default)]
pub(super) struct Table<'a> {
    counts: Option<Entry<'a>>,
    /// Line behind `BEGIN CTAB`, where COUNTS should stand.
    counts_line: usize,
    /// Entries of the atom block.
    pub(super) atoms: Vec<Entry<'a>>,
    /// Entries of the bond block.
    pub(super) bonds: Vec<Entry<'a>>,
    /// Everything else in the table, in its order.
    pub(super) others: Vec<Block<'a>>,
    /// Lines behind the table, as they stand.
    pub(super) behind: Vec<&'a str>,
    /// Where the table was when the text ended, if it had not come to its end.
    cut: Option<Cut>,
    /// Line at which the text ended.
    last_line: usize,
}

/// How far a table came that does not end as it should.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Cut {
    Atoms,
    Elsewhere,
}

/// A block other than those of atoms and bonds, or an entry that stands by itself.
#[derive(Debug)]
pub(super) struct Block<'a> {
    /// Its name in capitals; empty for an entry by itself.
    pub(super) name: String,
    /// The entry that begins it.
    pub(super) begin: Option<Entry<'a>>,
    /// What stands in it.
    pub(super) entries: Vec<Entry<'a>>,
}

/// Numbers of the COUNTS entry.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub(super) struct Counts {
    pub(super) sgroups: usize,
    pub(super) chiral: bool,
    pub(super) line: usize,
}

/// Where the walk stands.
#[derive(Debug)]
enum Place {
    Table,
    Atoms,
    Bonds,
    /// In the last of `others`; blocks open inside of it.
    Other(Vec<String>),
    Behind,
}

/// What an entry does: names and words in capitals.
enum Step {
    Begins(String),
    Ends(String),
    /// Neither; its first word.
    Holds(String),
}

/// Parts a table; `number` is the line of the counts line before it.
pub(super) fn part<'a>(
    mut lines: Lines<'a>,
    number: usize,
    notices: &mut Vec<Notice>,
) -> Result<Table<'a>, ReadError> {
    let mut walk = Walk {
        table: Table::default(),
        place: Place::Table,
        notices,
    };
    walk.begin(&mut lines, number)?;
    walk.table.counts_line = lines.number();
    let ended = walk.walk_on(&mut lines)?;
    let line = lines.number();
    walk.close(ended, line);
    Ok(walk.table)
}

struct Walk<'a, 'n> {
    table: Table<'a>,
    place: Place,
    notices: &'n mut Vec<Notice>,
}

impl<'a> Walk<'a, '_> {
    fn notice(&mut self, line: usize, code: &'static str, text: String) {
        self.notices.push(Notice::new(line, code, text));
    }

    /// `BEGIN CTAB`, behind blank lines if need be.
    fn begin(&mut self, lines: &mut Lines<'a>, number: usize) -> Result<(), ReadError> {
        while lines.peek().is_some_and(|line| line.trim().is_empty()) {
            lines.next();
        }
        match lines::next(lines, self.notices) {
            Some(Item::Entry(entry)) if entry.head() == ["BEGIN", "CTAB"] => Ok(()),
            Some(Item::Entry(entry)) => {
                let reason = misplaced(&entry, "BEGIN CTAB");
                Err(entry.error(0, entry.len(), reason))
            }
            _ => Err(ReadError::line(number, Reason::NotV3000)),
        }
    }

    /// Goes to the line that ends the molfile; false if there is none.
    fn walk_on(&mut self, lines: &mut Lines<'a>) -> Result<bool, ReadError> {
        loop {
            let number = lines.number();
            if let Place::Behind = self.place {
                let Some(line) = lines.next() else {
                    return Ok(false);
                };
                if is_end(line) {
                    self.check_end(line, number);
                    return Ok(true);
                }
                if line.starts_with("M  ") {
                    self.table.behind.push(line);
                } else if !line.trim().is_empty() {
                    self.stray(line, number)?;
                }
                continue;
            }
            match lines::next(lines, self.notices) {
                None => return Ok(false),
                Some(Item::End(line)) => {
                    self.check_end(line, number);
                    return Ok(true);
                }
                Some(Item::Stray(line)) if line.trim().is_empty() => {}
                Some(Item::Stray(line)) => self.stray(line, number)?,
                Some(Item::Entry(entry)) => self.take(entry)?,
            }
        }
    }

    fn check_end(&mut self, line: &str, number: usize) {
        if !line.starts_with("M  END") {
            let text = format!("'{}' was read as M  END", line.trim_end());
            self.notice(number, "end-line", text);
        }
    }

    /// A line without prefix could be half an atom or a bond; elsewhere it is left out.
    fn stray(&mut self, line: &str, number: usize) -> Result<(), ReadError> {
        if matches!(self.place, Place::Atoms | Place::Bonds) {
            return Err(ReadError::line(number, Reason::NoPrefix));
        }
        let text = format!("a line that is none of the table: {}", line.trim_end());
        self.notice(number, "stray-line", text);
        Ok(())
    }

    fn take(&mut self, entry: Entry<'a>) -> Result<(), ReadError> {
        let [first, second] = entry.head();
        let step = match first.as_str() {
            "" => return Ok(()),
            "BEGIN" => Step::Begins(second),
            "END" => Step::Ends(second),
            _ => Step::Holds(first),
        };
        match &mut self.place {
            Place::Table => return self.in_table(entry, step),
            Place::Atoms => match step {
                Step::Ends(name) if name == "ATOM" => self.place = Place::Table,
                Step::Holds(_) => self.table.atoms.push(entry),
                Step::Begins(_) | Step::Ends(_) => return self.leave("ATOM", entry),
            },
            Place::Bonds => match step {
                Step::Ends(name) if name == "BOND" => self.place = Place::Table,
                Step::Holds(_) => self.table.bonds.push(entry),
                Step::Begins(_) | Step::Ends(_) => return self.leave("BOND", entry),
            },
            Place::Other(_) => return self.in_other(entry, step),
            Place::Behind => {}
        }
        Ok(())
    }

    /// An entry of the table itself.
    fn in_table(&mut self, entry: Entry<'a>, step: Step) -> Result<(), ReadError> {
        match step {
            Step::Begins(name) if name == "ATOM" => self.place = Place::Atoms,
            Step::Begins(name) if name == "BOND" => self.place = Place::Bonds,
            Step::Begins(name) => {
                self.table.others.push(Block {
                    name,
                    begin: Some(entry),
                    entries: Vec::new(),
                });
                self.place = Place::Other(Vec::new());
            }
            Step::Ends(name) if name == "CTAB" => self.place = Place::Behind,
            Step::Ends(name) => {
                let text = format!("END {name} ends no block and was left out");
                self.notice(entry.line, "block-end", text);
            }
            Step::Holds(word) if word == "COUNTS" && self.table.counts.is_none() => {
                self.table.counts = Some(entry);
            }
            Step::Holds(word) if word.starts_with(|c: char| c.is_ascii_alphabetic()) => {
                self.table.others.push(Block {
                    name: String::new(),
                    begin: None,
                    entries: vec![entry],
                });
            }
            // an atom or a bond outside of its block
            Step::Holds(_) => {
                let reason = misplaced(&entry, "the beginning of a block");
                return Err(entry.error(0, entry.len(), reason));
            }
        }
        Ok(())
    }

    /// An entry of a block that is kept as it stands, or of a block inside of it.
    fn in_other(&mut self, entry: Entry<'a>, step: Step) -> Result<(), ReadError> {
        let (Place::Other(open), Some(block)) = (&mut self.place, self.table.others.last_mut())
        else {
            return Ok(());
        };
        match step {
            Step::Begins(name) if open.is_empty() && OWN.contains(&name.as_str()) => {
                let name = block.name.clone();
                return self.leave(&name, entry);
            }
            Step::Begins(name) if open.len() < DEEPEST => open.push(name),
            Step::Begins(_) => {}
            Step::Ends(name) => match open.iter().rposition(|other| *other == name) {
                Some(i) => open.truncate(i),
                None if name == block.name => {
                    self.place = Place::Table;
                    return Ok(());
                }
                None if name == "CTAB" => {
                    let name = block.name.clone();
                    return self.leave(&name, entry);
                }
                None => {}
            },
            Step::Holds(_) => {}
        }
        block.entries.push(entry);
        Ok(())
    }

    /// Leaves a block that does not end before an entry that cannot stand in it.
    fn leave(&mut self, name: &str, entry: Entry<'a>) -> Result<(), ReadError> {
        let text = format!("the end of the block {name} is missing");
        self.notice(entry.line, "block-end", text);
        self.place = Place::Table;
        self.take(entry)
    }

    fn close(&mut self, ended: bool, line: usize) {
        self.table.last_line = line;
        self.table.cut = match self.place {
            Place::Behind => None,
            Place::Atoms => Some(Cut::Atoms),
            Place::Bonds | Place::Table | Place::Other(_) => Some(Cut::Elsewhere),
        };
        if ended && self.table.cut.is_some() {
            let text = "the line END CTAB is missing".to_owned();
            self.notice(line.saturating_sub(1), "block-end", text);
        } else if !ended {
            let text = "the line M  END is missing; all atoms and bonds were there".to_owned();
            self.notice(line, "no-end-line", text);
        }
    }
}

fn is_end(line: &str) -> bool {
    line.starts_with("M  END") || line.trim_end() == "M END"
}

fn misplaced(entry: &Entry<'_>, expected: &'static str) -> Reason {
    let words = entry.words().take(2).map(|w| w.text);
    Reason::Misplaced {
        found: words.collect::<Vec<_>>().join(" "),
        expected,
    }
}

impl Table<'_> {
    /// The COUNTS entry, which must fit the entries that there are.
    pub(super) fn counts(&self, notices: &mut Vec<Notice>) -> Result<Counts, ReadError> {
        let found = (self.atoms.len(), self.bonds.len());
        let Some(entry) = &self.counts else {
            let reason = Reason::CountsEntry { said: None, found };
            return Err(ReadError::line(self.counts_line, reason));
        };
        let words: Vec<_> = entry.words().skip(1).collect();
        let number = |i: usize, field| match words.get(i) {
            Some(word) => whole(entry, word, field),
            None => Err(missing(entry, field)),
        };
        let size = |n: i32| usize::try_from(n).unwrap_or(usize::MAX);
        let atoms = size(number(0, "the number of atoms")?);
        let bonds = size(number(1, "the number of bonds")?);
        if (atoms, bonds) != found {
            let end = words.get(1).map_or(entry.len(), |w| w.at + w.text.len());
            return Err(self.miscounted(entry, end, (atoms, bonds)));
        }
        // the rest of the entry names nothing that is drawn
        let optional = |i: usize| number(i, "").unwrap_or(0);
        for word in &words {
            if let Some((key, value)) = word.keyword() {
                let text = format!("{key}={} of the line COUNTS was left out", value.text);
                notices.push(Notice::new(entry.line, "keyword-left-out", text));
            }
        }
        Ok(Counts {
            sgroups: size(optional(2).max(0)),
            chiral: optional(4) == 1,
            line: entry.line,
        })
    }

    /// Why other numbers are said than found: the text broke off, or a line is lost or one too many.
    fn miscounted(&self, entry: &Entry<'_>, end: usize, said: (usize, usize)) -> ReadError {
        let found = (self.atoms.len(), self.bonds.len());
        let early = |what| ReadError::line(self.last_line, Reason::EndsEarly(what));
        match self.cut {
            Some(Cut::Atoms) if found.0 < said.0 => early("its last atom"),
            Some(_) if found.0 == said.0 && found.1 < said.1 => early("its last bond"),
            _ => {
                let said = Some(said);
                entry.error(0, end, Reason::CountsEntry { said, found })
            }
        }
    }
}
