//! Placing the letters of an atom's label: which side its hydrogens go to, where its charge finds room.

use super::face::{CAP_HEIGHT, Set, Setter};
use super::plane::{self, Hull};
use super::spelling::{Core, Level, Piece, Spelling};
use super::{Face, Style};
use crate::geom;
use kurbo::{Point, Vec2};

/// How far a subscript hangs below the line and a superscript is raised, in type sizes.
const SUB_DROP: f64 = 0.16;
const SUPER_RISE: f64 = 0.32;

/// A label in its place.
#[derive(Clone, Debug, Default)]
pub(super) struct Label {
    /// Its runs, in reading order.
    pub(super) sets: Vec<Set>,
}

impl Label {
    pub(super) fn hulls(&self) -> impl Iterator<Item = &Hull> {
        self.sets.iter().flat_map(|s| &s.hulls)
    }

    /// How far a line from `from` must go to be clear of the label by `margin`; 0 if it is at once.
    pub(super) fn exit(&self, from: Point, u: Vec2, margin: f64) -> f64 {
        self.hulls()
            .filter_map(|hull| plane::exit(hull, from, u, margin))
            .fold(0.0, f64::max)
    }
}

/// Where the hydrogens of a label stand.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Side {
    Right,
    Left,
    Below,
    Above,
}

impl Side {
    /// The way to it from the symbol, length 1, on the page.
    fn direction(self) -> Vec2 {
        match self {
            Side::Right => Vec2::new(1.0, 0.0),
            Side::Left => Vec2::new(-1.0, 0.0),
            Side::Below => Vec2::new(0.0, 1.0),
            Side::Above => Vec2::new(0.0, -1.0),
        }
    }
}

/// Where its charge or mass number stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Corner {
    After,
    Before,
    Over,
    Under,
}

/// The side of the symbol that the bonds leave free, preferring right, then left, and above or below
/// only when both are taken (GR-2.1.2). Directions are those of the bonds, on the page.
pub(super) fn free_side(spelling: &Spelling, bonds: &[Vec2]) -> Side {
    match bonds {
        [] => {
            // water, hydrogen sulfide, hydrogen halides: hydrogen first
            let first = matches!(
                spelling.core,
                Core::Symbol("O" | "S" | "Se" | "Te" | "F" | "Cl" | "Br" | "I")
            ) && spelling.charge.is_empty();
            if first { Side::Left } else { Side::Right }
        }
        [only] => {
            if only.x > 0.3 {
                Side::Left
            } else {
                Side::Right
            }
        }
        _ => {
            let sides = rooms(bonds);
            // a bond within 57 degrees takes a side
            sides[..2].iter().find(|s| s.1 > 1.0).map_or_else(
                || {
                    sides
                        .iter()
                        .fold(
                            sides[0],
                            |best, s| if s.1 > best.1 + 1e-6 { *s } else { best },
                        )
                        .0
                },
                |s| s.0,
            )
        }
    }
}

/// The angle from each side to the nearest bond, in the order in which sides are preferred.
fn rooms(bonds: &[Vec2]) -> [(Side, f64); 4] {
    [Side::Right, Side::Left, Side::Below, Side::Above].map(|side| {
        let room = bonds
            .iter()
            .map(|b| geom::between(*b, side.direction()))
            .fold(f64::INFINITY, f64::min);
        (side, room)
    })
}

/// The free side, or another one with room among the bonds if something else on the page stands where the
/// hydrogens would; `others` are the places of nearby atoms as seen from this one.
fn clear_side(style: &Style, spelling: &Spelling, bonds: &[Vec2], others: &[Vec2]) -> Side {
    let preferred = free_side(spelling, bonds);
    if spelling.hydrogens == 0 {
        return preferred;
    }
    let blocked = |side: Side| {
        let spot = side.direction() * (0.85 * style.font_size);
        others
            .iter()
            .any(|other| (*other - spot).hypot() < 0.8 * style.font_size)
    };
    if !blocked(preferred) {
        return preferred;
    }
    rooms(bonds)
        .into_iter()
        .filter(|(side, room)| *room > 0.7 && !blocked(*side))
        .map(|(side, _)| side)
        .next()
        .unwrap_or(preferred)
}

/// Places a label with its symbol's middle at `at`; `others` are the places of nearby atoms as
/// seen from there.
pub(super) fn place(
    setter: &mut Setter,
    style: &Style,
    spelling: &Spelling,
    at: Point,
    bonds: &[Vec2],
    others: &[Vec2],
) -> Label {
    let layout = Layout {
        style,
        spelling,
        at,
        side: clear_side(style, spelling, bonds, others),
    };
    let (number, plain) = layout.number(setter, bonds);
    if spelling.charge.is_empty() {
        return plain;
    }
    let mut corners = vec![Corner::After];
    let starts_with_symbol = layout.side != Side::Left
        || (spelling.hydrogens == 0 && matches!(spelling.core, Core::Symbol(_)));
    if starts_with_symbol && spelling.isotope.is_empty() {
        corners.push(Corner::Before);
    }
    if layout.side != Side::Above && number != Some(Corner::Over) {
        corners.push(Corner::Over);
    }
    if layout.side != Side::Below && number != Some(Corner::Under) {
        corners.push(Corner::Under);
    }
    let labels = corners
        .into_iter()
        .map(|corner| layout.set(setter, number, Some(corner)))
        .collect();
    clearest(style, &plain, labels, at, bonds).unwrap_or(plain)
}

/// The first label for which bonds need stop hardly sooner than for `plain`, or else the one that
/// costs them least.
fn clearest(
    style: &Style,
    plain: &Label,
    labels: Vec<Label>,
    at: Point,
    bonds: &[Vec2],
) -> Option<Label> {
    let mut best: Option<(f64, Label)> = None;
    for label in labels {
        let loss = loss(style, plain, &label, at, bonds);
        if loss < 0.08 * style.font_size {
            return Some(label);
        }
        if best.as_ref().is_none_or(|(least, _)| loss < *least - 1e-9) {
            best = Some((loss, label));
        }
    }
    best.map(|(_, label)| label)
}

/// How much sooner some bond must stop for `label` than for `plain`.
fn loss(style: &Style, plain: &Label, label: &Label, at: Point, bonds: &[Vec2]) -> f64 {
    let margin = style.label_margin;
    bonds
        .iter()
        .map(|u| label.exit(at, *u, margin) - plain.exit(at, *u, margin))
        .fold(0.0, f64::max)
}

struct Layout<'a> {
    style: &'a Style,
    spelling: &'a Spelling,
    at: Point,
    side: Side,
}

/// Pieces of a line of letters; the bonds meet the middle of `pieces[anchor]`, or of its first or
/// last letter.
struct Line {
    pieces: Vec<Piece>,
    anchor: usize,
    meet: Meet,
}

#[derive(Clone, Copy)]
enum Meet {
    Middle,
    FirstLetter,
    LastLetter,
}

impl Layout<'_> {
    /// Where the mass number finds room: before the symbol, or above or below it if a bond comes from
    /// the upper left; and the label with it.
    fn number(&self, setter: &mut Setter, bonds: &[Vec2]) -> (Option<Corner>, Label) {
        let plain = self.set(setter, None, None);
        if self.spelling.isotope.is_empty() {
            return (None, plain);
        }
        let mut corners = vec![Corner::Before];
        if self.side != Side::Above {
            corners.push(Corner::Over);
        }
        if self.side != Side::Below {
            corners.push(Corner::Under);
        }
        let mut best: Option<(f64, Corner, Label)> = None;
        for corner in corners {
            let label = self.set(setter, Some(corner), None);
            let loss = loss(self.style, &plain, &label, self.at, bonds);
            // out of its usual place only if a bond would lose a good part
            let loss = if loss < 0.3 * self.style.font_size {
                0.0
            } else {
                loss
            };
            if best.as_ref().is_none_or(|(least, ..)| loss < *least - 1e-9) {
                best = Some((loss, corner, label));
            }
        }
        best.map_or((None, plain), |(_, corner, label)| (Some(corner), label))
    }

    fn set(&self, setter: &mut Setter, number: Option<Corner>, charge: Option<Corner>) -> Label {
        let size = self.style.font_size;
        let line = self.line(number, charge);
        let baseline = self.at.y + 0.5 * CAP_HEIGHT * size;
        let mut sets = set_line(setter, self.style, &line, self.at.x, baseline);
        for (text, corner) in [
            (&self.spelling.isotope, number),
            (&self.spelling.charge, charge),
        ] {
            let shift = match corner {
                // just clear of the symbol
                Some(Corner::Over) => -(CAP_HEIGHT + 0.08 - SUPER_RISE) * size,
                Some(Corner::Under) => {
                    (0.08 + SUPER_RISE + CAP_HEIGHT * self.style.script_size) * size
                }
                Some(Corner::After | Corner::Before) | None => continue,
            };
            let script = Line {
                pieces: vec![Piece::new(text.clone(), Level::Super)],
                anchor: 0,
                meet: Meet::Middle,
            };
            let script = set_line(setter, self.style, &script, self.at.x, baseline + shift);
            if text == &self.spelling.isotope {
                sets.splice(0..0, script);
            } else {
                sets.extend(script);
            }
        }
        if self.spelling.hydrogens > 0 && matches!(self.side, Side::Above | Side::Below) {
            let hydrogens = Line {
                pieces: self.hydrogens(),
                anchor: 0,
                meet: Meet::Middle,
            };
            let drop = if self.spelling.hydrogens > 1 {
                SUB_DROP
            } else {
                0.0
            };
            let step = if self.side == Side::Below {
                (CAP_HEIGHT + 0.12) * size
            } else {
                -(CAP_HEIGHT + 0.12 + drop) * size
            };
            let mut h = set_line(setter, self.style, &hydrogens, self.at.x, baseline + step);
            if self.side == Side::Below {
                sets.append(&mut h);
            } else {
                h.append(&mut sets);
                sets = h;
            }
        }
        Label { sets }
    }

    fn hydrogens(&self) -> Vec<Piece> {
        match self.spelling.hydrogens {
            0 => Vec::new(),
            1 => vec![Piece::new("H", Level::Base)],
            n => vec![
                Piece::new("H", Level::Base),
                Piece::new(n.to_string(), Level::Sub),
            ],
        }
    }

    /// The line that the symbol stands in.
    fn line(&self, number: Option<Corner>, charge: Option<Corner>) -> Line {
        let s = self.spelling;
        let mut pieces = Vec::new();
        if self.side == Side::Left {
            pieces = self.hydrogens();
        }
        if charge == Some(Corner::Before) {
            pieces.push(Piece::new(s.charge.clone(), Level::Super));
        }
        if number == Some(Corner::Before) {
            pieces.push(Piece::new(s.isotope.clone(), Level::Super));
        }
        let start = pieces.len();
        let (anchor, meet) = match &s.core {
            Core::Symbol(symbol) => {
                pieces.push(Piece::new(*symbol, Level::Base));
                (start, Meet::Middle)
            }
            Core::Group(units) if self.side == Side::Left => {
                pieces.extend(units.iter().rev().flatten().cloned());
                let first = units.first().map_or(1, Vec::len);
                (pieces.len() - first, Meet::FirstLetter)
            }
            Core::Group(units) => {
                pieces.extend(units.iter().flatten().cloned());
                (start, Meet::FirstLetter)
            }
            Core::Text(text) => {
                pieces.extend(text.iter().cloned());
                let meet = if self.side == Side::Left && text.len() == 1 {
                    Meet::LastLetter
                } else {
                    Meet::FirstLetter
                };
                (start, meet)
            }
        };
        if self.side == Side::Right {
            pieces.extend(self.hydrogens());
        }
        if charge == Some(Corner::After) {
            pieces.push(Piece::new(s.charge.clone(), Level::Super));
        }
        Line {
            pieces,
            anchor,
            meet,
        }
    }
}

/// Sets a line so that its anchor's middle is at `x`; neighbours of one level become one run.
fn set_line(setter: &mut Setter, style: &Style, line: &Line, x: f64, baseline: f64) -> Vec<Set> {
    let size = |level| match level {
        Level::Base => style.font_size,
        Level::Sub | Level::Super => style.font_size * style.script_size,
    };
    let mut starts = Vec::with_capacity(line.pieces.len());
    let mut end = 0.0;
    for piece in &line.pieces {
        starts.push(end);
        end += setter.advance(&piece.text, Face::Upright, size(piece.level));
    }
    let middle = line.pieces.get(line.anchor).map_or(0.0, |piece| {
        let start = Point::new(starts[line.anchor], 0.0);
        let set = setter.set(&piece.text, Face::Upright, size(piece.level), start);
        let met = match line.meet {
            Meet::Middle => plane::bounds(set.hulls.iter().flatten()),
            Meet::FirstLetter => plane::bounds(set.hulls.first().into_iter().flatten()),
            Meet::LastLetter => plane::bounds(set.hulls.last().into_iter().flatten()),
        };
        met.map_or(start.x, |r| r.center().x)
    });
    let mut sets = Vec::new();
    let mut i = 0;
    while let Some(first) = line.pieces.get(i) {
        let mut text = first.text.clone();
        let start = starts[i];
        i += 1;
        while let Some(next) = line.pieces.get(i).filter(|next| next.level == first.level) {
            text.push_str(&next.text);
            i += 1;
        }
        let y = match first.level {
            Level::Base => baseline,
            Level::Sub => baseline + SUB_DROP * style.font_size,
            Level::Super => baseline - SUPER_RISE * style.font_size,
        };
        let origin = Point::new(x - middle + start, y);
        sets.push(setter.set(&text, Face::Upright, size(first.level), origin));
    }
    sets
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::ink::STYLES;

    fn spelling(symbol: &'static str, hydrogens: u8, charge: &str) -> Spelling {
        Spelling {
            isotope: String::new(),
            core: Core::Symbol(symbol),
            hydrogens,
            charge: charge.to_owned(),
        }
    }

    fn written(s: &Spelling, degrees: &[f64]) -> (String, Label) {
        let bonds: Vec<Vec2> = degrees
            .iter()
            .map(|d| geom::unit(-d.to_radians()))
            .collect();
        let label = place(
            &mut Setter::default(),
            &STYLES[0],
            s,
            Point::new(3.0, 4.0),
            &bonds,
            &[],
        );
        let text = label.sets.iter().map(|s| s.run.text.as_str()).collect();
        (text, label)
    }

    #[test]
    fn hydrogens_stand_on_the_free_side() {
        let oh = spelling("O", 1, "");
        let nh2 = spelling("N", 2, "");
        let nh = spelling("N", 1, "");
        assert_eq!(written(&oh, &[180.0]).0, "OH");
        assert_eq!(written(&oh, &[30.0]).0, "HO");
        assert_eq!(written(&oh, &[90.0]).0, "OH");
        assert_eq!(written(&nh2, &[-30.0]).0, "H2N");
        assert_eq!(written(&spelling("O", 2, ""), &[]).0, "H2O");
        assert_eq!(written(&spelling("N", 3, ""), &[]).0, "NH3");
        // vertices of a ring: left, right, and the bottom one where both sides are taken
        assert_eq!(free_side(&nh, &bonds(&[30.0, -90.0])), Side::Left);
        assert_eq!(free_side(&nh, &bonds(&[150.0, -90.0])), Side::Right);
        assert_eq!(free_side(&nh, &bonds(&[30.0, 150.0])), Side::Below);
        assert_eq!(free_side(&nh, &bonds(&[-30.0, -150.0])), Side::Above);
    }

    #[test]
    fn hydrogens_give_way_to_what_stands_there() {
        let nh = spelling("N", 1, "");
        let below = bonds(&[-90.0]);
        let side = |others: &[Vec2]| clear_side(&STYLES[0], &nh, &below, others);
        assert_eq!(side(&[]), Side::Right);
        let to_the_right = Vec2::new(STYLES[0].font_size * 1.2, 0.0);
        assert_eq!(side(&[to_the_right]), Side::Left);
        assert_eq!(side(&[to_the_right, -to_the_right]), Side::Above);
    }

    fn bonds(degrees: &[f64]) -> Vec<Vec2> {
        degrees
            .iter()
            .map(|d| geom::unit(-d.to_radians()))
            .collect()
    }

    #[test]
    fn the_bond_meets_the_symbol_and_not_its_hydrogen() {
        for degrees in [0.0, 180.0, 90.0, 30.0, -150.0] {
            let (_, label) = written(&spelling("O", 1, ""), &[degrees]);
            let o = label
                .sets
                .iter()
                .find_map(|s| s.run.text.find('O').map(|i| &s.hulls[i]))
                .unwrap();
            let middle = plane::bounds(o).unwrap().center();
            assert!(middle.distance(Point::new(3.0, 4.0)) < 0.1, "{degrees}");
        }
    }

    #[test]
    fn subscripts_hang_and_charges_are_raised() {
        let (text, label) = written(&spelling("N", 3, "+"), &[180.0]);
        assert_eq!(text, "NH3+");
        let y: Vec<f64> = label.sets.iter().map(|s| s.run.origin.y).collect();
        assert!(y[1] > y[0] && y[2] < y[0]);
        assert!(label.sets[1].run.size < label.sets[0].run.size);
    }

    #[test]
    fn a_charge_gives_way_to_a_bond() {
        let minus = spelling("O", 0, "−");
        assert_eq!(written(&minus, &[180.0]).0, "O−");
        assert_eq!(written(&minus, &[35.0]).0, "−O");
        let (_, label) = written(&spelling("N", 0, "+"), &[45.0, 135.0, -45.0, -135.0]);
        let charge = plane::bounds(label.sets[1].hulls.iter().flatten()).unwrap();
        assert!((charge.center().x - 3.0).abs() < 0.5);
    }
}
