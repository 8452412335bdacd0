//! Labels depend on the molecule that is drawn, not on how its file or its drawing is made: the worked
//! examples. (The drawings of the public suite go through the same changes in `suite.rs`.)

use checks::hold::{self, same_numbers};
use checks::labels::Labels;
use checks::{change, kekule, labels_of, no_misses, worked};

const SEEDS: u64 = 20;

#[test]
fn order_of_atoms_and_bonds_does_not_matter() {
    hold::order_does_not_matter(&worked(), SEEDS);
}

#[test]
fn place_size_and_turn_on_the_sheet_do_not_matter() {
    hold::place_does_not_matter(&worked(), SEEDS);
}

#[test]
fn mirror_images_have_mirrored_labels() {
    hold::mirror_images_mirror(&worked());
}

// of double bonds only those that lie between mirrored groups change, and these only by their groups
#[test]
fn solid_for_hashed_shows_the_mirror_image() {
    hold::hold(
        &worked(),
        1,
        |drawing, _| Some(same_numbers(change::swapped(drawing))),
        Labels::mirrored,
    );
}

#[test]
fn another_kekule_form_has_the_same_labels() {
    let tried = hold::kekule_form_does_not_matter(&worked(), SEEDS);
    assert!(tried >= 45 * 20, "only {tried} drawings had another form");
}

#[test]
fn forms_are_found_where_there_are_any() {
    let all = worked();
    let mut several = 0;
    for k in &all {
        let first = kekule::double_bonds(&k.drawing);
        let mut forms: Vec<Vec<usize>> = (1..=40)
            .filter_map(|seed| kekule::other_form(&k.drawing, &mut change::Dice::new(seed)))
            .map(|form| kekule::double_bonds(&form))
            .collect();
        forms.sort();
        forms.dedup();
        assert!(
            forms.iter().all(|f| *f != first && f.len() == first.len()),
            "{}",
            k.title
        );
        several += usize::from(forms.len() >= 3);
    }
    // two rings, or two fused ones, have three other forms or more
    assert!(
        several >= 15,
        "only {several} drawings had three other forms"
    );
}

#[test]
fn without_marks_no_centre_is_labelled() {
    let mut misses = Vec::new();
    let all = worked();
    for w in &all {
        let read = labels_of(&change::bare(&w.drawing));
        let geometry_only = read
            .0
            .iter()
            .all(|(n, d)| checks::labels::is_geometry(*d) && w.labels.0.get(n) == Some(d));
        if !geometry_only {
            misses.push(format!("{}: read `{read}` without marks", w.title));
        }
    }
    no_misses(&misses, all.len());
}
