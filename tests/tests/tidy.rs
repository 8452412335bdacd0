//! Rules of the house that a machine can check.

use checks::no_misses;
use checks::source::{files, short, text};
use checks::top;
use std::path::Path;

const MOST_LINES: usize = 600;

#[test]
fn every_module_says_what_it_is_for() {
    let all = rust_files();
    let misses: Vec<String> = all
        .iter()
        .filter(|path| !text(path).starts_with("//!"))
        .map(|path| format!("{} does not open with //!", short(path)))
        .collect();
    no_misses(&misses, all.len());
}

#[test]
fn no_file_is_too_long() {
    let all = rust_files();
    let misses: Vec<String> = all
        .iter()
        .map(|path| (path, text(path).lines().count()))
        .filter(|(_, lines)| *lines > MOST_LINES)
        .map(|(path, lines)| format!("{}: {lines} lines", short(path)))
        .collect();
    no_misses(&misses, all.len());
}

#[test]
fn the_tree_for_developers_names_every_module() {
    let guide = text(&top().join("DEVELOPERS.md"));
    let words: Vec<&str> = guide
        .split(|c: char| !c.is_alphanumeric() && c != '_')
        .collect();
    let mut all = files("chem/src", &["rs"]);
    all.extend(files("app/src", &["rs"]));
    let misses: Vec<String> = all
        .iter()
        .filter(|path| !words.contains(&module_name(path).as_str()))
        .map(|path| format!("DEVELOPERS.md does not name {}", short(path)))
        .collect();
    no_misses(&misses, all.len());
}

/// Stem of a file; of `mod.rs`, and of the tests of a module, that of the module's folder.
fn module_name(path: &Path) -> String {
    let name = |p: &Path| {
        p.file_stem()
            .unwrap_or_default()
            .to_string_lossy()
            .into_owned()
    };
    let above = || path.parent().map(module_name).unwrap_or_default();
    let is_test = path
        .parent()
        .is_some_and(|folder| folder.ends_with("tests"));
    match name(path).as_str() {
        "mod" | "tests" => above(),
        _ if is_test => above(),
        stem => stem.to_owned(),
    }
}

#[test]
fn no_word_that_means_nothing_to_a_reader() {
    // in two pieces, so that this file passes
    let words: Vec<String> = [
        ("lec", "ture"),
        ("trans", "cript"),
        ("/ro", "ot/"),
        ("/wo", "rk/"),
        ("/ho", "me/"),
        ("seed ", "document"),
    ]
    .iter()
    .map(|(a, b)| [*a, *b].concat())
    .collect();
    let all = files(
        ".",
        &["rs", "md", "toml", "py", "tsv", "sdf", "mol", "svg", ""],
    );
    let mut misses = Vec::new();
    for path in &all {
        let Ok(content) = std::fs::read_to_string(path) else {
            continue;
        };
        for (i, line) in content.to_lowercase().lines().enumerate() {
            misses.extend(
                words
                    .iter()
                    .filter(|w| line.contains(w.as_str()))
                    .map(|w| format!("{}:{}: {w}", short(path), i + 1)),
            );
        }
    }
    no_misses(&misses, all.len());
}

#[test]
fn tables_name_no_record_twice() {
    let mut titles = Vec::new();
    for (name, drawn) in [
        ("worked", checks::by_name()),
        ("clauses", checks::by_clause()),
    ] {
        let table = text(&top().join(format!("tests/corpus/{name}.tsv")));
        let rows: Vec<String> = table
            .lines()
            .filter(|line| !line.starts_with('#'))
            .filter_map(|line| line.split('\t').next().map(str::to_owned))
            .collect();
        let drawn: Vec<String> = drawn.into_iter().map(|k| k.title).collect();
        assert_eq!(drawn, rows, "{name}.sdf is not drawn from {name}.tsv");
        titles.extend(rows);
    }
    let n = titles.len();
    titles.sort_unstable();
    titles.dedup();
    assert_eq!(titles.len(), n, "a title stands twice in the tables");
}

fn rust_files() -> Vec<std::path::PathBuf> {
    let mut all = files("chem/src", &["rs"]);
    all.extend(files("app/src", &["rs"]));
    all.extend(files("tests", &["rs"]));
    all
}
