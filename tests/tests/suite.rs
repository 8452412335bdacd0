//! The drawings of the public CIP Validation Suite, where they lie beside the project: each carries the
//! labels of its authors, and still does after every change that keeps the molecule.

use checks::hold;
use checks::{Known, labels_of, no_misses, suite};
use chem::cip::{Limits, Missing, Ranker};
use chem::perceive::Rings;
use chem::stereo::{Descriptor, Units};
use chem::wedge;

const SEEDS: u64 = 20;

/// Runs a check on the drawings, or says that there are none.
fn on_suite(check: impl Fn(&[Known])) {
    match suite() {
        Some(known) => check(&known),
        None => not_present(),
    }
}

#[allow(clippy::print_stderr, reason = "tells what was not run")]
fn not_present() {
    eprintln!("the public suite is not present");
}

#[test]
fn the_labels_are_those_of_the_authors() {
    on_suite(|known| {
        let misses: Vec<String> = known
            .iter()
            .filter_map(|k| {
                let read = labels_of(&k.drawing);
                (read != k.labels)
                    .then(|| format!("{}: read `{read}`, not `{}`", k.title, k.labels))
            })
            .collect();
        no_misses(&misses, known.len());
    });
}

#[test]
fn order_of_atoms_and_bonds_does_not_matter() {
    on_suite(|known| hold::order_does_not_matter(known, SEEDS));
}

#[test]
fn place_size_and_turn_on_the_sheet_do_not_matter() {
    on_suite(|known| hold::place_does_not_matter(known, SEEDS));
}

#[test]
fn mirror_images_have_mirrored_labels() {
    on_suite(hold::mirror_images_mirror);
}

#[test]
fn another_kekule_form_has_the_same_labels() {
    on_suite(|known| {
        let tried = hold::kekule_form_does_not_matter(known, SEEDS);
        assert!(tried >= 25 * 20, "only {tried} drawings had another form");
    });
}

/// Units of a drawing that are not decided within a bound of nodes.
fn stopped(known: &Known, nodes: usize) -> usize {
    let molecule = known.drawing.molecule();
    let rings = Rings::find(molecule);
    let units = Units::find(molecule, &rings);
    let limits = Limits {
        nodes,
        ..Limits::default()
    };
    let reading = wedge::read(&known.drawing, &units);
    Ranker::new(molecule, &rings, &units, limits)
        .label_defined(reading.configurations())
        .into_iter()
        .flatten()
        .filter(|label| matches!(label.descriptor, Err(Missing::Stopped(_))))
        .count()
}

// the largest digraph of the suite has 4,064 nodes (VS218, counted by a program in another language)
#[test]
fn digraphs_do_not_grow_past_the_known_size() {
    on_suite(|known| {
        let over: Vec<String> = known
            .iter()
            .filter(|k| stopped(k, 4_064) > 0)
            .map(|k| k.title.clone())
            .collect();
        no_misses(&over, known.len());
        assert!(known.iter().any(|k| stopped(k, 1_000) > 0));
    });
}

// what reflection does to each letter: IUPAC 2013 recommendations, P-91.2.1.1, from memory
#[test]
fn reflection_exchanges_these_letters_and_no_others() {
    for (letter, image) in [
        ('R', 'S'),
        ('S', 'R'),
        ('M', 'P'),
        ('P', 'M'),
        ('e', 'z'),
        ('z', 'e'),
        ('r', 'r'),
        ('s', 's'),
        ('m', 'm'),
        ('p', 'p'),
        ('E', 'E'),
        ('Z', 'Z'),
    ] {
        let descriptor = Descriptor::from_letter(letter).expect("a descriptor");
        assert_eq!(descriptor.mirrored().letter(), image, "{letter}");
    }
}
