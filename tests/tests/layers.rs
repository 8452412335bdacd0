//! Data flows one way through the chemistry, and the chemistry knows nothing of windows.

use checks::source::{code_lines, files, short, text};
use checks::{no_misses, top};

/// Modules of the chemistry in the order in which its `lib.rs` lists them, lowest first.
fn declared() -> Vec<String> {
    let lib = text(&top().join("chem/src/lib.rs"));
    code_lines(&lib)
        .filter_map(|(_, line)| line.trim().strip_prefix("pub mod ")?.strip_suffix(';'))
        .map(str::to_owned)
        .collect()
}

/// Modules named behind `crate::` in a line of code, a braced list among them.
fn named(line: &str) -> Vec<&str> {
    let mut names = Vec::new();
    for (at, found) in line.match_indices("crate::") {
        let rest = &line[at + found.len()..];
        let list = match rest.strip_prefix('{') {
            None => rest,
            Some(list) => {
                let mut depth = 1;
                let mut is_start = true;
                for (i, c) in list.char_indices() {
                    if is_start && (c.is_alphabetic() || c == '_') {
                        names.extend(first_word(&list[i..]));
                        is_start = false;
                    }
                    match c {
                        '{' => depth += 1,
                        '}' => depth -= 1,
                        ',' if depth == 1 => is_start = true,
                        _ => {}
                    }
                    if depth == 0 {
                        break;
                    }
                }
                continue;
            }
        };
        names.extend(first_word(list));
    }
    names
}

fn first_word(text: &str) -> Option<&str> {
    let end = text
        .find(|c: char| !c.is_alphanumeric() && c != '_')
        .unwrap_or(text.len());
    (end > 0).then_some(&text[..end])
}

#[test]
fn names_are_found_in_paths_and_lists() {
    assert_eq!(named("use crate::geom::Point;"), ["geom"]);
    assert_eq!(
        named("use crate::{cip::{self, Rule}, wedge, stereo::Kind};"),
        ["cip", "wedge", "stereo"]
    );
    assert!(named("use super::Drawing;").is_empty());
}

#[test]
fn no_module_uses_a_later_one() {
    let order = declared();
    assert!(order.len() >= 10, "lib.rs lists {order:?}");
    let root = top().join("chem/src");
    let (mut misses, mut tried) = (Vec::new(), 0);
    for path in files("chem/src", &["rs"]) {
        let inside = path.strip_prefix(&root).expect("below chem/src");
        let first = inside.iter().next().expect("a name").to_string_lossy();
        let own = first.trim_end_matches(".rs");
        if own == "lib" {
            continue;
        }
        let Some(rank) = order.iter().position(|m| m == own) else {
            misses.push(format!("{}: lib.rs does not list {own}", short(&path)));
            continue;
        };
        // a `use` may run over several lines: those are joined first
        let code = text(&path);
        let code: Vec<_> = code_lines(&code).collect();
        for (i, (number, line)) in code.iter().enumerate() {
            if !line.contains("crate::") {
                continue;
            }
            let joined: String = code[i..]
                .iter()
                .take(20)
                .scan(false, |done, (_, l)| {
                    let before = *done;
                    *done = l.contains(';') || !line.contains("crate::{");
                    (!before).then_some(*l)
                })
                .collect();
            for name in named(&joined) {
                tried += 1;
                if order
                    .iter()
                    .position(|m| m == name)
                    .is_none_or(|r| r > rank)
                {
                    misses.push(format!("{}:{number}: {own} uses {name}", short(&path)));
                }
            }
        }
    }
    no_misses(&misses, tried);
}

#[test]
fn the_chemistry_knows_no_window_clock_or_command_line() {
    let manifest = text(&top().join("chem/Cargo.toml"));
    let misses: Vec<String> = [
        "egui", "eframe", "rfd", "clap", "jiff", "tempfile", "lyon", "krilla",
    ]
    .iter()
    .filter(|name| manifest.lines().any(|l| l.trim_start().starts_with(**name)))
    .map(|name| format!("chem/Cargo.toml names {name}"))
    .collect();
    no_misses(&misses, 1);
    let uses = [
        "std::fs",
        "std::net",
        "std::process",
        "std::time",
        "std::env",
    ];
    let mut misses = Vec::new();
    let all = files("chem/src", &["rs"]);
    for path in &all {
        let code = text(path);
        for (number, line) in code_lines(&code) {
            misses.extend(
                uses.iter()
                    .filter(|u| line.contains(**u))
                    .map(|u| format!("{}:{number}: {u}", short(path))),
            );
        }
    }
    no_misses(&misses, all.len());
}

#[test]
fn only_the_window_names_egui() {
    let window = top().join("app/src/window");
    let all = files("app/src", &["rs"]);
    let mut misses = Vec::new();
    for path in &all {
        let is_window = path.starts_with(&window) || path.ends_with("app/src/window.rs");
        if is_window {
            continue;
        }
        let code = text(path);
        misses.extend(
            code_lines(&code)
                .filter(|(_, line)| line.contains("egui"))
                .map(|(number, line)| format!("{}:{number}: {}", short(path), line.trim())),
        );
    }
    no_misses(&misses, all.len());
}
