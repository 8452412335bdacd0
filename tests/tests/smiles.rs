//! Lines of notation: labelled as their names or other readers say, in any order of writing, and written
//! so that they say the same.
#![allow(
    clippy::expect_used,
    clippy::panic,
    clippy::print_stdout,
    reason = "a check that cannot be set up has failed; one that was not run says so"
)]

use checks::change::Dice;
use checks::labels::Labels;
use checks::lines::Isomer;
use checks::{by_clause, by_name, no_misses, top};
use chem::format::smiles::{self, Fault};
use chem::stereo::Descriptor;
use std::collections::BTreeMap;
use std::fs;
use std::path::PathBuf;

const SEEDS: u64 = 10;

/// Lines beside the worked examples: what those lack (sulfur, phosphorus, axes, cumulated chains, signs at
/// ring numbers, isotopes), with the labels that follow from the cited rule.
const MORE: &[(&str, &str, &str)] = &[
    (
        "N[C@@H](C)C(=O)O",
        "2S",
        "OpenSMILES, Tetrahedral centers: L-alanine",
    ),
    ("N[C@H](C(=O)O)C", "2S", "the same in another order"),
    ("C[C@H](N)C(=O)O", "2S", "the same in another order"),
    (
        "[C@@H](N)(C)C(=O)O",
        "1R",
        "hydrogen first: the mirror image",
    ),
    (
        "OC(=O)[C@@H]1CCCN1",
        "4S",
        "IUPAC-IUB 1983: L-proline, ring number before the chain",
    ),
    ("N1CCC[C@H]1C(=O)O", "5S", "the same, from the nitrogen"),
    (
        "F/C=C/F",
        "2E 3E",
        "OpenSMILES, Cis/trans configuration: trans",
    ),
    ("F\\C=C\\F", "2E 3E", "the same"),
    ("C(\\F)=C/F", "1E 3E", "the same, from the middle"),
    ("F\\C=C/F", "2Z 3Z", "OpenSMILES: cis"),
    ("C(/F)=C/F", "1Z 3Z", "the same, from the middle"),
    (
        "C1=C/CCCCCC/1",
        "1E 2E",
        "trans-cyclooctene, IUPAC 2013 recommendations, P-93.5.1.4; sign at the closing number",
    ),
    (
        "C\\1=C/CCCCCC1",
        "1E 2E",
        "the same, sign at the opening number",
    ),
    ("C\\1=C/CCCCCC/1", "1E 2E", "the same, both signs"),
    (
        "F/C=C=C=C/F",
        "2E 5E",
        "IUPAC 2013 recommendations, P-93.4.2.1: cumulated chain with even number of atoms lies flat",
    ),
    (
        "ClC=[C@]=CCl",
        "2M 4M",
        "OpenSMILES, Extended tetrahedral; P-93.4.2.2: anticlockwise Cl, H, H, Cl is M",
    ),
    ("ClC=[C@@]=CCl", "2P 4P", "its mirror image"),
    ("ClC=[C@AL2]=CCl", "2P 4P", "the same by its class"),
    (
        "C[S@](=O)CC",
        "2S",
        "P-93.3.3.2: lone pair lowest; O > ethyl > methyl",
    ),
    ("CC[S@](C)=O", "3S", "the same in another order"),
    (
        "C[S@+]([O-])CC",
        "2S",
        "the same, the bond drawn with charges",
    ),
    (
        "C[P@](CC)c1ccccc1",
        "2R",
        "P-93.3: lone pair lowest; phenyl > ethyl > methyl",
    ),
    ("C[P@@](c1ccccc1)CC", "2R", "the same in another order"),
    (
        "[2H][C@H](O)C",
        "2S",
        "Rule 2, P-92.3: deuterium > hydrogen; (1S)-ethan-1-(2H)ol has O > C > D > H",
    ),
    (
        "C/C=N/O",
        "2E 3E",
        "P-93.5.1.2: lone pair lowest; (E)-acetaldehyde oxime",
    ),
    (
        "C[C@H](O)[C@@H](O)C",
        "2S 4S",
        "(2S,3S)-butane-2,3-diol, CRC Handbook",
    ),
    (
        "C[C@H](O)[C@H](O)C",
        "2S 4R",
        "meso-butane-2,3-diol (2R,3S)",
    ),
];

fn known(line: &str) -> Isomer {
    smiles::read(line)
        .unwrap_or_else(|e| panic!("{line}: {e}"))
        .into()
}

/// Whether a structure of the tables says what its drawing does: axes and cumulated chains are only drawn,
/// and a nitrogen with one ring number is written there in the sense of the program that draws it, which
/// turns it (see [`DIFFER`]).
fn says_all(line: &str, labels: &Labels) -> bool {
    use Descriptor::{LowerM, LowerP, M, P};
    let is_axis = |d: &Descriptor| matches!(d, M | P | LowerM | LowerP);
    let turned = line.split("[N@").skip(1).any(|rest| {
        let after = rest.split_once(']').map_or("", |(_, after)| after);
        after.starts_with(|c: char| c.is_ascii_digit())
    });
    line != "-" && !line.contains("=C=") && !labels.0.values().any(is_axis) && !turned
}

/// Every line of the tables with its labels: published names and single clauses of the worked examples,
/// and [`MORE`].
fn lines() -> Vec<(String, Labels)> {
    let mut all = Vec::new();
    for (table, column, examples) in [
        ("tests/corpus/worked.tsv", 3, by_name()),
        ("tests/corpus/clauses.tsv", 4, by_clause()),
    ] {
        let text = fs::read_to_string(top().join(table)).expect("a table of the corpus");
        let rows = text.lines().filter(|row| !row.starts_with('#'));
        let cells = rows.map(|row| row.split('\t').collect::<Vec<_>>());
        let lines: BTreeMap<&str, &str> = cells.map(|c| (c[0], c[column])).collect();
        let written = examples
            .into_iter()
            .map(|e| (lines[e.title.as_str()], e.labels));
        all.extend(
            written
                .filter(|(line, labels)| says_all(line, labels))
                .map(|(line, labels)| (line.to_owned(), labels)),
        );
    }
    all.extend(
        MORE.iter()
            .map(|(line, labels, _)| ((*line).to_owned(), Labels::parse(labels))),
    );
    all
}

#[test]
fn lines_carry_the_labels_of_their_names() {
    let all = lines();
    let misses: Vec<String> = all
        .iter()
        .filter_map(|(line, labels)| {
            let read = known(line).labels();
            (read != *labels).then(|| format!("{line}: read `{read}`, named `{labels}`"))
        })
        .collect();
    no_misses(&misses, all.len());
}

#[test]
fn order_of_writing_does_not_matter() {
    let (mut misses, mut tried) = (Vec::new(), 0);
    for (line, labels) in lines() {
        for seed in 1..=SEEDS {
            tried += 1;
            let (other, numbers) = known(&line).reordered(&mut Dice::new(seed));
            let (again, places, text) = other.rewritten();
            let want = labels.renumbered(&numbers).renumbered(&places);
            let read = again.labels();
            if read != want {
                misses.push(format!("{line} -> {text}: read `{read}`, not `{want}`"));
            }
        }
    }
    no_misses(&misses, tried);
}

#[test]
fn the_other_signs_show_the_mirror_image() {
    let (mut misses, mut tried) = (Vec::new(), 0);
    for (line, labels) in lines() {
        tried += 1;
        let want = labels.mirrored();
        let (again, places, text) = known(&line).mirrored().rewritten();
        let read = again.labels();
        // by exchanging the signs themselves
        let exchanged = line
            .replace("@@", "\0")
            .replace('@', "@@")
            .replace('\0', "@");
        let exchanged = exchanged.replace("@@AL2", "@AL1");
        let by_hand = known(&exchanged).labels();
        if read != want.renumbered(&places) || by_hand != want {
            misses.push(format!(
                "{line} -> {text}: read `{read}` and `{by_hand}`, not `{want}`"
            ));
        }
    }
    no_misses(&misses, tried);
}

/// A file of the open data beside the project, or where `OPEN_DATA` says: its rows, in cells.
fn open_data(name: &str) -> Vec<Vec<String>> {
    let folder = std::env::var_os("OPEN_DATA").map_or("../shared".into(), PathBuf::from);
    let path = top().join(folder).join("data").join(name);
    let Ok(text) = fs::read_to_string(path) else {
        println!("not run: {name} is not present");
        return Vec::new();
    };
    let rows = text.lines().filter(|row| !row.starts_with('#'));
    rows.map(|row| row.split('\t').map(str::to_owned).collect())
        .collect()
}

/// Records of the CIP Validation Suite whose label only a drawing can say: hindered axes and helices.
const NEED_A_DRAWING: [&str; 8] = [
    "VS010", "VS011", "VS023", "VS055", "VS057", "VS073", "VS086", "VS158",
];

#[test]
fn the_validation_suite_is_labelled_as_published() {
    let rows = open_data("cip.smi");
    let mut misses = Vec::new();
    for row in &rows {
        let (line, id) = (&row[0], row[1].as_str());
        let mut want = Labels::parse(row.get(2).map_or("", String::as_str));
        if NEED_A_DRAWING.contains(&id) {
            want = Labels::default();
        }
        if id == "VS072" {
            // its hindered axis
            want.0.retain(|n, _| *n == 17);
        }
        let (again, places, text) = known(line).rewritten();
        let (read, rewritten) = (known(line).labels(), again.labels());
        if read != want {
            misses.push(format!("{id} {line}: read `{read}`, published `{want}`"));
        }
        if rewritten != want.renumbered(&places) {
            misses.push(format!("{id} {line} -> {text}: read `{rewritten}`"));
        }
    }
    if !rows.is_empty() {
        no_misses(&misses, rows.len());
    }
}

/// Records on which RDKit 2026.9.1 labels otherwise, and why.
const DIFFER: [(&str, &str); 5] = [
    (
        "DC-00325",
        "nitrogen with three neighbours and one ring number: RDKit turns it; in its sense the cage cannot be built",
    ),
    ("DC-01385", "the same cage"),
    (
        "CH-06943",
        "phosphazene: RDKit's label depends on where the ring's double bonds are written",
    ),
    ("CH-07737", "phosphazene"),
    ("CH-10145", "phosphazene"),
];

#[test]
fn real_lines_are_labelled_as_by_the_outside_reader() {
    let rows = open_data("stereo.smi");
    let mut misses = Vec::new();
    for row in &rows {
        let (line, id, want) = (&row[0], row[1].as_str(), row[3].as_str());
        let read = match smiles::read(line) {
            Ok(line) => Isomer::from(line).labels().to_string(),
            Err(error) => error.to_string(),
        };
        let differs = DIFFER.iter().any(|(known, _)| *known == id);
        if (read != want) != differs {
            misses.push(format!("{id} {line}: read `{read}`, RDKit `{want}`"));
        }
    }
    if !rows.is_empty() {
        no_misses(&misses, rows.len());
    }
}

/// Leaves lines as given and as written in `target/tmp/written.tsv`, for `tests/reference/lines_vs_rdkit.py`.
#[test]
fn written_lines_are_left_for_the_outside_reader() {
    let mut text = String::new();
    let mut tried = 0;
    for (line, _) in lines() {
        for seed in 1..=SEEDS {
            let (_, _, written) = known(&line).reordered(&mut Dice::new(seed)).0.rewritten();
            text.push_str(&format!("{line}\t{written}\n"));
            tried += 1;
        }
    }
    for row in open_data("stereo.smi")
        .iter()
        .chain(&open_data("pathological.smi"))
    {
        if let Ok(line) = smiles::read(&row[0]) {
            let (_, _, written) = Isomer::from(line).rewritten();
            text.push_str(&format!("{}\t{written}\n", row[0]));
        }
    }
    let path = concat!(env!("CARGO_TARGET_TMPDIR"), "/written.tsv");
    fs::write(path, text).expect("a file in the folder of builds");
    no_misses(&[], tried);
}

#[test]
fn hard_lines_are_read_and_written() {
    let rows = open_data("pathological.smi");
    let mut misses = Vec::new();
    for row in &rows {
        let (line, id) = (row[0].as_str(), row[1].as_str());
        match smiles::read(line) {
            Ok(read) => {
                let defined = |k: &Isomer| {
                    let open = chem::stereo::Configuration::Open;
                    k.configurations.iter().filter(|c| **c != open).count()
                };
                let read = Isomer::from(read);
                let (again, _, text) = read.rewritten();
                if defined(&read) != defined(&again) {
                    misses.push(format!("{id} {line} -> {text}"));
                }
            }
            // centres of more than two arrangements are refused
            Err(error) if matches!(error.reason, Fault::ManyArrangements(_)) => {}
            Err(error) => misses.push(format!("{id} {line}: {error}")),
        }
    }
    if !rows.is_empty() {
        no_misses(&misses, rows.len());
    }
}
