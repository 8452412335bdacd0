//! Aromatic bonds turned into alternating ones, or refused.

use super::*;

#[test]
fn aromatic_bonds_become_alternating_ones() {
    let doubles = |text: &str| {
        let record = good(text);
        let m = record.drawing.molecule().clone();
        assert!(m.atoms().all(|a| m.valence_is_usual(a)), "{text}");
        assert!(codes(&record).contains(&"aromatic-bonds"));
        m.bonds()
            .filter(|b| m.bond(*b).order == Order::Double)
            .count()
    };
    assert_eq!(doubles(&ring_mol(&["C"; 6], "  4", "")), 3);
    assert_eq!(
        doubles(&ring_mol(&["C", "C", "N", "C", "C", "N"], "  4", "")),
        3
    );
    assert_eq!(doubles(&ring_mol(&["S", "C", "C", "C", "C"], "  4", "")), 2);
    assert_eq!(doubles(&ring_mol(&["N", "C", "C", "C", "C"], "  4", "")), 2);
    assert_eq!(
        doubles(&ring_mol(&["C"; 5], "  4", "M  CHG  1   1  -1\n")),
        2
    );
    assert_eq!(
        doubles(&ring_mol(&["C"; 7], "  4", "M  CHG  1   3   1\n")),
        3
    );
    // which nitrogen bears the hydrogen?
    let imidazole = ring_mol(&["N", "C", "N", "C", "C"], "  4", "");
    assert_eq!(bad(&imidazole).reason, Reason::SeveralPatterns(vec![1, 3]));
    let (mut atoms, mut bonds) = ring(&["N", "C", "N", "C", "C"], "  4");
    atoms.push(("H".into(), 3.0, 0.0));
    bonds.push("  1  6  1".into());
    let atoms: Vec<_> = atoms.iter().map(|a| (a.0.as_str(), a.1, a.2)).collect();
    let bonds: Vec<_> = bonds.iter().map(String::as_str).collect();
    assert_eq!(doubles(&mol(&atoms, &bonds, "")), 2);
    assert!(matches!(
        bad(&ring_mol(&["C"; 5], "  4", "")).reason,
        Reason::NoPattern(_)
    ));
}

/// Two five-membered and two seven-membered rings in a row need odd rings drawn together.
#[test]
fn aromatic_odd_rings() {
    let azulene = [
        (1, 2),
        (2, 3),
        (3, 4),
        (4, 5),
        (5, 1),
        (4, 6),
        (6, 7),
        (7, 8),
        (8, 9),
        (9, 10),
        (10, 5),
    ];
    let bonds: Vec<String> = azulene
        .iter()
        .map(|(a, b)| format!("{a:3}{b:3}  4"))
        .collect();
    let bonds: Vec<&str> = bonds.iter().map(String::as_str).collect();
    let atoms: Vec<_> = (0..10)
        .map(|i| ("C", f64::from(i), f64::from(i * i % 7)))
        .collect();
    let record = good(&mol(&atoms, &bonds, ""));
    let m = record.drawing.molecule();
    assert_eq!(
        m.bonds()
            .filter(|b| m.bond(*b).order == Order::Double)
            .count(),
        5
    );
    assert!(
        m.atoms()
            .all(|a| m.bond_pairs(a) + m.hydrogens(a) == 4 && m.bond_pairs(a) >= 3)
    );
}
