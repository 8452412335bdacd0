//! Every worked example carries what its published name says.

use checks::{labels_of, no_misses, worked};

#[test]
fn drawings_carry_the_labels_of_their_names() {
    let all = worked();
    let misses: Vec<String> = all
        .iter()
        .filter_map(|w| {
            let read = labels_of(&w.drawing);
            (read != w.labels).then(|| format!("{}: read `{read}`, named `{}`", w.title, w.labels))
        })
        .collect();
    no_misses(&misses, all.len());
}
