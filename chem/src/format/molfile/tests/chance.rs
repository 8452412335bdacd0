//! Texts damaged by chance: nothing panics, and writing is stable.

use super::*;
use proptest::prelude::*;

proptest! {
    #![proptest_config(ProptestConfig::with_cases(400))]

    #[test]
    fn any_bytes_are_met_calmly(bytes in proptest::collection::vec(any::<u8>(), 0..600)) {
        if let Ok((text, _)) = crate::format::text::decode(&bytes, 1) {
            for record in sdf::records(&text) {
                let _ = record.read();
            }
        }
        let _ = crate::format::text::recognize(&bytes);
    }

    /// Damaged records are refused or read; what was read can be written, and that is stable.
    #[test]
    fn damage_is_met_calmly_and_writing_is_stable(
        changes in proptest::collection::vec((any::<proptest::sample::Index>(), "[ -~\n\t\r]|é"), 0..6),
        cut in proptest::option::of(any::<proptest::sample::Index>()),
        base in 0usize..3,
    ) {
        let mut text = [
            alanine(),
            ring_mol(&["N", "C", "C", "R#", "C", "C"], "  4", "A    2\nCF3\nM  RGP  1   4   2\nM  CHG  1   1   1\n"),
            mol(&ALANINE, &ALANINE_BONDS, "M  STY  1   1 DAT\n") + "> <A>\n5\n\n> <B> (x)\na\nb\n\n$$$$\n",
        ][base].clone();
        for (place, with) in changes {
            let at = place.index(text.len());
            if text.is_char_boundary(at) && text.is_char_boundary(at + 1) {
                text.replace_range(at..=at, &with);
            }
        }
        if let Some(place) = cut {
            let at = place.index(text.len());
            if text.is_char_boundary(at) {
                text.truncate(at);
            }
        }
        for record in sdf::records(&text).filter_map(|r| r.read().ok()) {
            let Ok(once) = sdf::write(&record, &WriteOptions::default()) else { continue };
            let list: Vec<_> = sdf::records(&once).collect();
            prop_assert_eq!(list.len(), 1, "{}", once);
            let again = list[0].read();
            prop_assert!(again.is_ok(), "{:?}\n{}", again, once);
            if let Ok(again) = again {
                prop_assert_eq!(sdf::write(&again, &WriteOptions::default()).ok(), Some(once));
                prop_assert_eq!(again.drawing.marks().len(), record.drawing.marks().len());
            }
        }
    }
}
