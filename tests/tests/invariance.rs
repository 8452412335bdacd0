//! Labels depend on the molecule that is drawn, not on how its file or its drawing is made.

use checks::change::{self, Dice};
use checks::labels::Labels;
use checks::{Worked, labels_of, no_misses, worked};
use chem::drawing::Drawing;
use chem::geom::{self, Point};

const SEEDS: u64 = 20;

/// Every worked example, changed once per seed, carries what `expect` makes of its labels.
fn hold(
    seeds: u64,
    change: impl Fn(&Drawing, &mut Dice) -> (Drawing, Vec<usize>),
    expect: impl Fn(&Labels) -> Labels,
) {
    let mut misses = Vec::new();
    let mut tried = 0;
    for Worked {
        title,
        labels,
        drawing,
    } in worked()
    {
        for seed in 1..=seeds {
            let (other, numbers) = change(&drawing, &mut Dice::new(seed));
            let (read, want) = (labels_of(&other), expect(&labels).renumbered(&numbers));
            tried += 1;
            if read != want {
                misses.push(format!("{title}, seed {seed}: read `{read}`, not `{want}`"));
            }
        }
    }
    no_misses(&misses, tried);
}

fn same_numbers(drawing: &Drawing) -> Vec<usize> {
    (1..=drawing.molecule().n_atoms()).collect()
}

#[test]
fn order_of_atoms_and_bonds_does_not_matter() {
    hold(SEEDS, change::reordered, Labels::clone);
}

#[test]
fn place_size_and_turn_on_the_sheet_do_not_matter() {
    hold(
        SEEDS,
        |drawing, dice| {
            let angle = std::f64::consts::TAU * dice.unit();
            let scale = 10f64.powf(4.0 * dice.unit() - 2.0);
            let shift = geom::Vec2::new(dice.unit() - 0.5, dice.unit() - 0.5) * 1000.0;
            let other = change::moved(drawing, |p| {
                let turned = geom::rotate(p, Point::ORIGIN, angle);
                (turned.to_vec2() * scale + shift).to_point()
            });
            (other, same_numbers(drawing))
        },
        Labels::clone,
    );
}

#[test]
fn a_mirrored_drawing_with_the_same_marks_shows_the_mirror_image() {
    hold(
        1,
        |drawing, _| (change::mirrored(drawing), same_numbers(drawing)),
        Labels::mirrored,
    );
}

#[test]
fn solid_for_hashed_shows_the_mirror_image() {
    hold(
        1,
        |drawing, _| (change::swapped(drawing), same_numbers(drawing)),
        Labels::mirrored,
    );
}

#[test]
fn the_sheet_turned_over_shows_the_same() {
    hold(
        SEEDS,
        |drawing, dice| change::reordered(&change::swapped(&change::mirrored(drawing)), dice),
        Labels::clone,
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
