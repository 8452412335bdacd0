//! Drawings made by chance: through V3000 and back they are the same. Texts damaged by chance.

use super::v3000::threonine;
use super::*;
use crate::drawing::Drawing;
use crate::format::GroupKind;
use crate::molecule::{Atom, Bond, Molecule};
use proptest::prelude::*;

/// What is stated of one atom, by numbers drawn by chance.
fn atom() -> impl Strategy<Value = Atom> {
    let placeholder = prop::sample::select(vec![
        "R#",
        "R7",
        "A",
        "QH",
        "[C,N]",
        "NOT[C, N]",
        "Boc-",
        "(x) \"y\" = z",
        "7",
    ]);
    let kind = prop_oneof![
        8 => prop::sample::select(vec!["C", "N", "O", "Cl", "H", "Fe"]).prop_map(|s| (s, None)),
        1 => placeholder.prop_map(|text| ("*", Some(text))),
        1 => Just(("C", Some("CF3 [a"))),
    ];
    (
        kind,
        -15i8..=15,
        0u8..4,
        proptest::option::of(1u16..300),
        proptest::option::of(0u8..=14),
        any::<u16>(),
    )
        .prop_map(
            |((symbol, alias), charge, radical, isotope, valence, map)| Atom {
                charge,
                radical: match radical {
                    0 => Radical::None,
                    1 => Radical::Singlet,
                    2 => Radical::Doublet,
                    _ => Radical::Triplet,
                },
                isotope,
                valence,
                alias: alias.map(Into::into),
                map,
                ..Atom::new(if symbol == "*" {
                    Element::ANY
                } else {
                    Element::from_symbol(symbol).unwrap()
                })
            },
        )
}

/// Atom and kind of a bond to an atom before it, its order and its mark.
type Link = (prop::sample::Index, u8, u8, bool);

fn drawing() -> impl Strategy<Value = Drawing> {
    let link = (any::<prop::sample::Index>(), 0u8..9, 0u8..5, any::<bool>());
    let place = || -99_999_999i64..99_999_999;
    let one = (atom(), link, place(), place(), place());
    (proptest::collection::vec(one, 1..40), any::<bool>()).prop_map(|(list, deep)| {
        let links: Vec<Link> = list.iter().map(|one| one.1).collect();
        let number = |n: i64| n as f64 / 1e6;
        let points = list.iter().map(|o| Point::new(number(o.2), number(o.3)));
        let points = points.collect();
        let depths = list.iter().map(|o| number(o.4)).collect();
        let atoms = list.into_iter().map(|one| one.0).collect();
        let mut bonds = Vec::new();
        let mut marks = Vec::new();
        for (i, (to, order, mark, turned)) in links.into_iter().enumerate().skip(1) {
            let order = match order {
                0..=3 => Order::Single,
                4 | 5 => Order::Double,
                6 => Order::Triple,
                7 => Order::Special(9),
                _ => Order::Special(0),
            };
            let end = if turned { End::Second } else { End::First };
            marks.push(match (order, mark) {
                (Order::Double, 1) => Mark::Crossed,
                (Order::Single, 1) => Mark::Solid(end),
                (Order::Single, 2) => Mark::Hashed(end),
                (Order::Single, 3) => Mark::Wavy(end),
                _ => Mark::Plain,
            });
            let ends = [AtomIx::new(i), AtomIx::new(to.index(i))];
            bonds.push(Bond { ends, order });
        }
        let molecule = Molecule::new(atoms, bonds).unwrap();
        let flat = Drawing::new(molecule, points, marks).unwrap();
        if deep {
            flat.with_depths(depths).unwrap()
        } else {
            flat
        }
    })
}

/// A mark as it is seen: its kind, the atom at the narrow end, and the two atoms of the bond.
fn seen(drawing: &Drawing, b: BondIx) -> (Order, Mark, Option<AtomIx>, [AtomIx; 2]) {
    let bond = drawing.molecule().bond(b);
    let mark = drawing.mark(b);
    let narrow = mark.narrow().map(|end| bond.ends[end.index()]);
    let mut ends = bond.ends;
    ends.sort_unstable();
    (bond.order, mark.at(End::First), narrow, ends)
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(300))]

    #[test]
    fn a_drawing_comes_back_through_v3000(
        drawing in drawing(),
        kinds in proptest::collection::vec((0u8..3, 1u32..5, 0usize..40), 0..6),
        chiral in any::<bool>(),
    ) {
        let mut record = Record::new("x", drawing);
        record.version = Version::V3000;
        record.chiral_flag = chiral;
        let n = record.drawing.molecule().n_atoms();
        for (kind, number, at) in kinds {
            let kind = match kind {
                0 => GroupKind::Absolute,
                1 => GroupKind::And(number),
                _ => GroupKind::Or(number),
            };
            if record.stereo_groups.iter().all(|g| g.kind != kind) {
                let atoms = (at % n..n).rev().map(AtomIx::new).collect();
                record.stereo_groups.push(StereoGroup { kind, atoms });
            }
        }
        let text = written(&record);
        prop_assert!(text.lines().all(|l| l.chars().count() < 80), "{}", text);
        let again = read(&text, 1);
        prop_assert!(again.is_ok(), "{:?}\n{}", again, text);
        let Ok(again) = again else { return Ok(()) };
        let (a, b) = (&record.drawing, &again.drawing);
        let (m, k) = (a.molecule(), b.molecule());
        prop_assert_eq!(m.n_atoms(), k.n_atoms());
        for x in m.atoms() {
            prop_assert_eq!(m.atom(x), k.atom(x), "{}", text);
        }
        prop_assert_eq!(a.points(), b.points());
        prop_assert_eq!(a.depths(), b.depths());
        prop_assert_eq!(m.n_bonds(), k.n_bonds());
        for x in m.bonds() {
            prop_assert_eq!(seen(a, x), seen(b, x));
        }
        prop_assert_eq!(&record.stereo_groups, &again.stereo_groups);
        prop_assert_eq!(record.chiral_flag, again.chiral_flag);
        prop_assert!(again.extra.is_empty());
        prop_assert_eq!(written(&again), text);
    }

    /// Damaged records are refused or read; what was read can be written, and that is stable.
    #[test]
    fn damaged_v3000_is_met_calmly_and_writing_is_stable(
        changes in proptest::collection::vec(
            (any::<prop::sample::Index>(), "[ -~\n\t\r]|é|-\n|\nM  V30 |BEGIN |END |SGROUP|CTAB|ATOMS=\\(1 "),
            0..8,
        ),
        swap in proptest::option::of((any::<prop::sample::Index>(), any::<prop::sample::Index>())),
        cut in proptest::option::of(any::<prop::sample::Index>()),
    ) {
        let mut text = threonine(&[
            "LINKNODE 1 3 2 1 2 1 8",
            "BEGIN SGROUP",
            "DEFAULT CLASS=DEMO",
            "4 DAT 0 ATOMS=(1 2) FIELDNAME=batch -",
            "FIELDDATA=\"7  \"\"b\"\"\"",
            "1 SUP 0 ATOMS=(1 8) LABEL=Me",
            "END SGROUP",
            "BEGIN COLLECTION",
            "MDLV30/HILITE ATOMS=(1 3)",
            "DEFAULT -",
            "MDLV30/STERAC1 ATOMS=(2 1 -",
            "2)",
            "MDLV30/STEABS ATOMS=(1 3)",
            "END COLLECTION",
        ]) + "> <A>\n5\n\n$$$$\n";
        text = text.replace("M  END", "M  V30 BEGIN RGROUP 1\nM  V30 END RGROUP\nM  END");
        if let Some((a, b)) = swap {
            let mut lines: Vec<&str> = text.split_inclusive('\n').collect();
            let (a, b) = (a.index(lines.len()), b.index(lines.len()));
            lines.swap(a, b);
            text = lines.concat();
        }
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
                prop_assert_eq!(again.stereo_groups, record.stereo_groups);
                prop_assert_eq!(again.drawing.marks().len(), record.drawing.marks().len());
            }
        }
    }
}
