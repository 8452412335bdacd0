//! The runner of the checks of invariance: known drawings are changed and read again.

use crate::change::{self, Dice};
use crate::labels::Labels;
use crate::{Known, kekule, labels_of, no_misses};
use chem::drawing::Drawing;
use chem::geom::{self, Point, Vec2};

/// A drawing and the new number of each of its atoms, both from 1.
pub type Changed = (Drawing, Vec<usize>);

/// Changes every drawing once per seed and compares what is read with what `expect` makes of its labels;
/// the number of changed drawings. Drawings that `change` leaves out do not count.
///
/// # Panics
/// If a label differs or nothing was tried.
pub fn hold(
    known: &[Known],
    seeds: u64,
    change: impl Fn(&Drawing, &mut Dice) -> Option<Changed>,
    expect: impl Fn(&Labels) -> Labels,
) -> usize {
    let mut misses = Vec::new();
    let mut tried = 0;
    for k in known {
        for seed in 1..=seeds {
            let Some((other, numbers)) = change(&k.drawing, &mut Dice::new(seed)) else {
                continue;
            };
            let (read, want) = (labels_of(&other), expect(&k.labels).renumbered(&numbers));
            tried += 1;
            if read != want {
                misses.push(format!(
                    "{}, seed {seed}: read `{read}`, not `{want}`",
                    k.title
                ));
            }
        }
    }
    no_misses(&misses, tried);
    tried
}

/// A change that keeps the numbers of the atoms.
pub fn same_numbers(drawing: Drawing) -> Changed {
    let numbers = (1..=drawing.molecule().n_atoms()).collect();
    (drawing, numbers)
}

/// Atoms, bonds and ends of bonds in another order.
pub fn order_does_not_matter(known: &[Known], seeds: u64) {
    hold(
        known,
        seeds,
        |drawing, dice| Some(change::reordered(drawing, dice)),
        Labels::clone,
    );
}

/// Turned by any angle, of any size, anywhere on the sheet.
pub fn place_does_not_matter(known: &[Known], seeds: u64) {
    hold(
        known,
        seeds,
        |drawing, dice| {
            let angle = std::f64::consts::TAU * dice.unit();
            let scale = 10f64.powf(4.0 * dice.unit() - 2.0);
            let shift = Vec2::new(dice.unit() - 0.5, dice.unit() - 0.5) * 1000.0;
            Some(same_numbers(change::moved(drawing, |p| {
                let turned = geom::rotate(p, Point::ORIGIN, angle);
                (turned.to_vec2() * scale + shift).to_point()
            })))
        },
        Labels::clone,
    );
}

/// Mirrored on the sheet with the same marks; with the marks exchanged; and both, which shows the same.
pub fn mirror_images_mirror(known: &[Known]) {
    let flat = |d: &Drawing, _: &mut Dice| Some(same_numbers(change::mirrored(d)));
    hold(known, 1, flat, Labels::mirrored);
    hold(
        known,
        1,
        |d, dice| {
            Some(change::reordered(
                &change::swapped(&change::mirrored(d)),
                dice,
            ))
        },
        Labels::clone,
    );
}

/// Another Kekulé form, also with its atoms in another order; the number of drawings tried.
///
/// # Panics
/// If a label differs, nothing was tried, or a form has its double bonds where they were.
pub fn kekule_form_does_not_matter(known: &[Known], seeds: u64) -> usize {
    hold(
        known,
        seeds,
        |drawing, dice| {
            let other = kekule::other_form(drawing, dice)?;
            assert_ne!(
                kekule::double_bonds(&other),
                kekule::double_bonds(drawing),
                "no double bond moved"
            );
            Some(change::reordered(&other, dice))
        },
        Labels::clone,
    )
}
