//! Styles: numbers only. Nothing here decides anything.

/// Points in a millimetre.
pub const POINTS_PER_MM: f64 = 72.0 / 25.4;

const MM: f64 = POINTS_PER_MM;

/// The measures of a figure. Lengths are points (1/72 in) at final size unless a name says otherwise.
#[derive(Clone, Debug, PartialEq)]
pub struct Style {
    /// Its name on the command line and in the window.
    pub name: &'static str,
    /// Where its numbers come from; to be shown beside the style.
    pub source: &'static str,
    /// Length of the median bond.
    pub bond_length: f64,
    /// Width of a plain line.
    pub line_width: f64,
    /// Width of a wedge at its wide end.
    pub wedge_width: f64,
    /// Distance from one bar of a hashed wedge to the next; half a wave of a wavy bond.
    pub hash_pitch: f64,
    /// Distance between the lines of a double bond as a fraction of the bond's length.
    pub double_gap: f64,
    /// White between a label and the ends of its bonds.
    pub label_margin: f64,
    /// Type size of atom labels.
    pub font_size: f64,
    /// Size of subscripts and superscripts as a fraction of the type size.
    pub script_size: f64,
    /// Type size of locants and descriptors.
    pub caption_size: f64,
    /// Type size of a note about the whole figure.
    pub note_size: f64,
    /// White round the figure on a page of its own.
    pub page_margin: f64,
    /// The widest figure that the place of print takes, if it sets a limit.
    pub width_limit: Option<f64>,
}

impl Style {
    /// The style of this name.
    pub fn named(name: &str) -> Option<&'static Style> {
        STYLES.iter().find(|s| s.name == name)
    }
}

/// All styles, the usual one first.
pub static STYLES: [Style; 4] = [
    // Bond, line, wedge, hash, gap, margin and type: the American Chemical Society's public page on
    // illustrations (pubs.acs.org, older page); width of a single column there 3.25 in.
    // Captions: 7 pt, the least that publishers' artwork pages ask; scripts 0.7 of 10 pt likewise.
    Style {
        name: "journal",
        source: "American Chemical Society, public page on illustrations: single column, 10 pt",
        bond_length: 14.4,
        line_width: 0.6,
        wedge_width: 2.0,
        hash_pitch: 2.5,
        double_gap: 0.18,
        label_margin: 1.6,
        font_size: 10.0,
        script_size: 0.7,
        caption_size: 7.0,
        note_size: 8.0,
        page_margin: 1.0,
        width_limit: Some(234.0),
    },
    // Type: capitals of 3.2 mm or more (37 CFR 1.84, PCT Rule 11.13, EPO decision of 25 November 2022),
    // with the face's capitals at 0.714 of its size; captions as large, since letters on a drawing sheet
    // are under the same rule. Line 0.4 mm: Japanese regulations, form 30. Width 170 mm: the usable area
    // that all of them leave. Bond, wedge and hash: our own, to survive the reduction to two thirds.
    Style {
        name: "patent",
        source: "37 CFR 1.84, PCT Rule 11.13, EPO OJ 2022 A113, JPO form 30: drawing sheet A4, capitals 3.2 mm",
        bond_length: 7.5 * MM,
        line_width: 0.4 * MM,
        wedge_width: 1.3 * MM,
        hash_pitch: 1.2 * MM,
        double_gap: 0.18,
        label_margin: 2.4,
        font_size: 13.0,
        script_size: 0.75,
        caption_size: 13.0,
        note_size: 13.0,
        page_margin: 2.0,
        width_limit: Some(170.0 * MM),
    },
    // A page to be kept and read at arm's length: our own numbers, in the ratios of GR-1.1 to GR-1.6.
    Style {
        name: "record",
        source: "common practice, no source: A4 or Letter, ratios of IUPAC 2008, GR-1",
        bond_length: 8.0 * MM,
        line_width: 0.35 * MM,
        wedge_width: 1.2 * MM,
        hash_pitch: 1.1 * MM,
        double_gap: 0.17,
        label_margin: 2.2,
        font_size: 12.0,
        script_size: 0.7,
        caption_size: 9.0,
        note_size: 9.0,
        page_margin: 2.0,
        width_limit: Some(170.0 * MM),
    },
    // For the window at its own size: our own numbers, in the same ratios.
    Style {
        name: "screen",
        source: "common practice, no source: the window, ratios of IUPAC 2008, GR-1",
        bond_length: 32.0,
        line_width: 1.4,
        wedge_width: 4.6,
        hash_pitch: 4.2,
        double_gap: 0.16,
        label_margin: 3.2,
        font_size: 17.0,
        script_size: 0.7,
        caption_size: 8.5,
        note_size: 12.0,
        page_margin: 4.0,
        width_limit: None,
    },
];

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_four_styles_hold_the_recommended_ratios() {
        let names: Vec<_> = STYLES.iter().map(|s| s.name).collect();
        assert_eq!(names, ["journal", "patent", "record", "screen"]);
        for s in &STYLES {
            let cap = 0.714 * s.font_size;
            // GR-1.1: a bond at least twice as long as the label is high
            assert!(s.bond_length >= 2.0 * cap, "{}", s.name);
            // GR-1.6: lines of a double bond within a third of its length
            assert!(s.double_gap <= 0.33, "{}", s.name);
            // GR-1.8: gaps between bars two to four line widths
            let gap = (s.hash_pitch - s.line_width) / s.line_width;
            assert!((1.95..=4.0).contains(&gap), "{} {gap}", s.name);
            let wedge = s.wedge_width / s.bond_length;
            // three line widths to a seventh of the bond, or what a heavier line needs
            assert!((0.13..=0.18).contains(&wedge), "{} {wedge}", s.name);
        }
        assert!(Style::named("patent").is_some_and(|s| s.font_size * 0.714 / MM >= 3.2));
    }
}
