//! Molecular formula and mass.

use super::Molecule;
use crate::element::Element;
use std::collections::BTreeMap;

/// A charge as labels have it: `+`, `2+`, `−`, `3−`; empty for none.
pub fn charge_text(charge: i32) -> String {
    let sign = if charge > 0 { '+' } else { '\u{2212}' };
    match charge.unsigned_abs() {
        0 => String::new(),
        1 => sign.to_string(),
        n => format!("{n}{sign}"),
    }
}

impl Molecule {
    /// Elements and their counts in Hill order (carbon, hydrogen, then by symbol; without carbon all by
    /// symbol); placeholders come last as `*`.
    pub fn formula(&self) -> Vec<(&'static str, usize)> {
        let mut counts: BTreeMap<&'static str, usize> = BTreeMap::new();
        for a in self.atoms() {
            *counts.entry(self.element(a).symbol()).or_default() += 1;
            let h = usize::from(self.hydrogens(a));
            if h > 0 {
                *counts.entry(Element::H.symbol()).or_default() += h;
            }
        }
        let has_carbon = counts.contains_key("C");
        let place = |symbol: &str| match symbol {
            "*" => 3,
            "C" if has_carbon => 0,
            "H" if has_carbon => 1,
            _ => 2,
        };
        let mut list: Vec<_> = counts.into_iter().collect();
        list.sort_by_key(|(symbol, _)| (place(symbol), *symbol));
        list
    }

    /// Molar mass in g/mol, stated isotopes at their exact mass.
    pub fn molar_mass(&self) -> f64 {
        self.atoms()
            .map(|a| self.atom(a).mass() + f64::from(self.hydrogens(a)) * Element::H.weight())
            .sum()
    }

    /// Sum of the formal charges.
    pub fn charge(&self) -> i32 {
        self.atoms().map(|a| i32::from(self.atom(a).charge)).sum()
    }
}

#[cfg(test)]
mod tests {
    use super::super::tests::build;

    #[test]
    fn hill_order() {
        let m = build(&["Br", "C", "C", "N"], &[(0, 1, 1), (1, 2, 1), (2, 3, 1)]);
        assert_eq!(m.formula(), [("C", 2), ("H", 6), ("Br", 1), ("N", 1)]);
        assert!((m.molar_mass() - 123.98).abs() < 0.02);
        let water = build(&["O"], &[]);
        assert_eq!(water.formula(), [("H", 2), ("O", 1)]);
    }
}
