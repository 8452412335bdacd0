//! How badly atoms and bonds of a pose lie on each other.

use super::Pose;
use crate::geom;

/// How near (in bond lengths) two atoms that are not joined may come.
#[derive(Clone, Copy)]
pub(super) struct Clash(f64);

/// Room for labels; asked for first.
pub(super) const ROOMY: Clash = Clash(0.7);
/// As near as a drawing can still be read.
pub(super) const TIGHT: Clash = Clash(0.5);

impl Clash {
    /// Sum over all pairs of atoms that collide and bonds that cross; 0 for a clear drawing. Quadratic in
    /// the number of atoms.
    pub(super) fn everywhere(self, pose: &Pose<'_>) -> f64 {
        let molecule = pose.drawing.molecule();
        let near = self.0 * pose.drawing.bond_length();
        let mut clash = 0.0;
        for a in molecule.atoms() {
            for b in molecule.atoms().skip(a.index() + 1) {
                let v = pose.at(b) - pose.at(a);
                if v.x.abs() < near && v.y.abs() < near {
                    let distance = v.hypot();
                    if distance < near && molecule.bond_between(a, b).is_none() {
                        clash += 1.0 + (near - distance) / near;
                    }
                }
            }
        }
        for b in molecule.bonds() {
            let [p, q] = molecule.bond(b).ends;
            for c in molecule.bonds().skip(b.index() + 1) {
                let [r, s] = molecule.bond(c).ends;
                if p == r || p == s || q == r || q == s {
                    continue;
                }
                if geom::cross(pose.at(p), pose.at(q), pose.at(r), pose.at(s)) {
                    clash += 1.0;
                }
            }
        }
        clash
    }
}
