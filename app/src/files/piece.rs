//! One record of a file, from its bytes to its drawing.

use chem::format::sdf::{Chunk, RawRecord, Reader};
use chem::format::smiles::{self, Smiles};
use chem::format::{Notice, ReadError, Reason, Record, text};
use std::borrow::Cow;

/// One record as it stands in its file.
#[derive(Debug)]
pub struct Piece {
    /// Number from 1.
    pub number: usize,
    /// Line at which it starts, from 1.
    pub line: usize,
    /// Its bytes, without `$$$$`.
    pub bytes: Vec<u8>,
    /// Whether a line `$$$$` ended it.
    pub ended: bool,
    /// Whether it is longer than any record that is read; its bytes are then not here.
    pub too_long: bool,
    /// Whether it is a line of notation, not a molfile.
    pub is_notation: bool,
}

/// A record as text.
#[derive(Debug)]
pub struct PieceText<'a> {
    /// All of it.
    pub text: Cow<'a, str>,
    number: usize,
    line: usize,
    /// That it is not UTF-8.
    notice: Option<Notice>,
}

impl From<Chunk<'_>> for Piece {
    fn from(chunk: Chunk<'_>) -> Piece {
        Piece {
            number: chunk.number,
            line: chunk.line,
            bytes: chunk.bytes.to_vec(),
            ended: chunk.ended,
            too_long: chunk.too_long,
            is_notation: false,
        }
    }
}

impl Piece {
    /// The record, understood.
    ///
    /// # Errors
    /// What is wrong with it, and where.
    pub fn read(&self) -> Result<Record, ReadError> {
        self.text()?.read()
    }

    /// The line of notation, understood; its notices have the line of the file.
    ///
    /// # Errors
    /// What is wrong with it, and where.
    pub fn read_notation(&self) -> Result<Smiles, ReadError> {
        let text = self.text()?;
        let mut line = smiles::read(&text.text).map_err(|error| ReadError {
            line: self.line,
            columns: Some((error.column, error.column)),
            reason: Reason::Notation(error.reason),
        })?;
        line.notices.extend(text.notice);
        for notice in &mut line.notices {
            notice.line = self.line;
        }
        Ok(line)
    }

    /// Its text.
    ///
    /// # Errors
    /// If it is too long or no text.
    pub fn text(&self) -> Result<PieceText<'_>, ReadError> {
        if self.too_long {
            let reason = if self.is_notation {
                Reason::Notation(smiles::Fault::TooLong(smiles::MOST_CHARACTERS))
            } else {
                Reason::TooLong(Reader::<&[u8]>::LIMIT)
            };
            return Err(ReadError::line(self.line, reason));
        }
        let (text, notice) = text::decode(&self.bytes, self.line)?;
        Ok(PieceText {
            text,
            number: self.number,
            line: self.line,
            notice,
        })
    }

    /// Its first line, or what follows a molecule in notation, as the name to show for it; a tab or other sign that would break a table is a blank.
    pub fn title(&self) -> String {
        let line = self.bytes.split(|b| matches!(b, b'\n' | b'\r')).next();
        let line = line.unwrap_or_default();
        let line = line.strip_prefix(b"\xEF\xBB\xBF").unwrap_or(line);
        let text = match std::str::from_utf8(line) {
            Ok(text) => text.to_owned(),
            Err(_) => line.iter().map(|b| char::from(*b)).collect(),
        };
        let text = if self.is_notation {
            smiles::title(&text)
        } else {
            text.trim_end()
        };
        text.replace(|c: char| c.is_control(), " ")
    }
}

impl PieceText<'_> {
    /// Parted into molfile and data fields.
    pub fn raw(&self) -> RawRecord<'_> {
        RawRecord::new(&self.text, self.number, self.line)
    }

    /// Whether it had to be read as Latin-1.
    pub fn is_latin(&self) -> bool {
        self.notice.is_some()
    }

    /// Understood.
    ///
    /// # Errors
    /// What is wrong with it, and where.
    pub fn read(&self) -> Result<Record, ReadError> {
        let mut record = self.raw().read()?;
        record.notices.extend(self.notice.clone());
        Ok(record)
    }
}
