//! The source files of the project, for the checks of its layout.

use crate::top;
use std::fs;
use std::path::{Path, PathBuf};

/// All files below a folder of the project with one of these endings (`rs`; an empty one for files
/// without), sorted; built files and the folder of the version history are left out.
///
/// # Panics
/// If a folder cannot be read.
pub fn files(folder: &str, endings: &[&str]) -> Vec<PathBuf> {
    let mut found = Vec::new();
    walk(&top().join(folder), endings, &mut found);
    found.sort();
    assert!(!found.is_empty(), "no files in {folder}");
    found
}

fn walk(folder: &Path, endings: &[&str], found: &mut Vec<PathBuf>) {
    let entries = fs::read_dir(folder).unwrap_or_else(|e| panic!("{}: {e}", folder.display()));
    for entry in entries {
        let path = entry.expect("an entry of a folder").path();
        let name = path.file_name().unwrap_or_default().to_string_lossy();
        if path.is_dir() {
            if !matches!(name.as_ref(), "target" | ".git" | "__pycache__") {
                walk(&path, endings, found);
            }
        } else if name != ".git" {
            // in a second working tree that is a file
            let ending = path.extension().unwrap_or_default().to_string_lossy();
            if endings.contains(&ending.as_ref()) {
                found.push(path);
            }
        }
    }
}

/// The text of a file.
///
/// # Panics
/// If it cannot be read as text.
pub fn text(path: &Path) -> String {
    fs::read_to_string(path).unwrap_or_else(|e| panic!("{}: {e}", path.display()))
}

/// Path below the top folder, for messages.
pub fn short(path: &Path) -> String {
    path.strip_prefix(top())
        .unwrap_or(path)
        .display()
        .to_string()
}

/// The lines of a source file that are code: no comment lines.
pub fn code_lines(text: &str) -> impl Iterator<Item = (usize, &str)> {
    text.lines()
        .enumerate()
        .filter(|(_, line)| !line.trim_start().starts_with("//"))
        .map(|(i, line)| (i + 1, line))
}
