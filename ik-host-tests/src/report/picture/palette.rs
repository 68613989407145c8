//! Colours by what they stand for. A drawing is made in the light colours; the style sheet of the page knows each
//! by its value and puts the dark one, a dash or a hatching in its place. So a drawing taken out of the page is still
//! right, if plain.
//!
//! Number systems: the palette of Okabe and Ito, "Color Universal Design" (from memory), which people with any of
//! the common colour vision deficiencies tell apart; dashes besides. The error scale is one hue whose lightness
//! alone orders it.

use plotters::style::RGBColor;
use std::fmt::Write as _;

pub(super) const INK: RGBColor = RGBColor(0x24, 0x29, 0x2e);
pub(super) const AXIS: RGBColor = RGBColor(0x6a, 0x73, 0x7d);
pub(super) const GRID: RGBColor = RGBColor(0xe2, 0xe6, 0xea);
/// Text among lines: the style sheet gives it a rim in the colour of the paper.
pub(super) const LABEL: RGBColor = RGBColor(0x25, 0x29, 0x2e);
pub(super) const LEG: RGBColor = RGBColor(0x24, 0x2a, 0x2e);
pub(super) const PAPER: RGBColor = RGBColor(0xff, 0xff, 0xff);
pub(super) const REACH: RGBColor = RGBColor(0xd3, 0xe6, 0xf3);
pub(super) const LINKS_REACH: RGBColor = RGBColor(0x80, 0x86, 0x8e);
pub(super) const KNEE_REACH: RGBColor = RGBColor(0x3c, 0x7c, 0xa8);
pub(super) const HIP_AXIS: RGBColor = RGBColor(0x81, 0x86, 0x8e);
pub(super) const JOINT_RANGE: RGBColor = RGBColor(0xe3, 0xc4, 0x6a);
pub(super) const WORK: RGBColor = RGBColor(0xa8, 0x4f, 0x00);
pub(super) const WORST: RGBColor = RGBColor(0xc0, 0x00, 0x60);
pub(super) const ALLOWED: RGBColor = RGBColor(0x25, 0x2a, 0x2e);
pub(super) const VOID: RGBColor = RGBColor(0xec, 0xed, 0xee);
/// Hatched by the style sheet.
pub(super) const UNREACHED: RGBColor = RGBColor(0x9a, 0xa0, 0xa6);
pub(super) const SERVO_RANGE: RGBColor = RGBColor(0xdd, 0xe3, 0xe8);
pub(super) const SERVO_USED: RGBColor = RGBColor(0x3d, 0x7c, 0xa8);

/// Errors, small to large.
pub(super) const SCALE: [RGBColor; 8] = [
    RGBColor(0xea, 0xf3, 0xf8),
    RGBColor(0xcf, 0xe2, 0xef),
    RGBColor(0xaf, 0xcd, 0xe3),
    RGBColor(0x8b, 0xb5, 0xd5),
    RGBColor(0x66, 0x99, 0xc2),
    RGBColor(0x46, 0x7b, 0xa9),
    RGBColor(0x2b, 0x5c, 0x89),
    RGBColor(0x14, 0x37, 0x5a),
];

/// By number system, in the order of [`crate::machine::NUMBERS`].
pub(super) const NUMBERS: [RGBColor; 6] = [
    RGBColor(0x00, 0x72, 0xb2),
    RGBColor(0xd5, 0x5e, 0x00),
    RGBColor(0x00, 0x9e, 0x73),
    RGBColor(0x7a, 0x68, 0x00),
    RGBColor(0x8a, 0x4f, 0x9e),
    RGBColor(0xb9, 0xbe, 0xc4),
];

/// What stands for a colour where the screen is dark.
const DARK: [(RGBColor, &str); 32] = [
    (INK, "#d5dbe1"),
    (AXIS, "#8b949e"),
    (GRID, "#2b3138"),
    (LABEL, "#e4e9ee"),
    (LEG, "#e6edf3"),
    (PAPER, "#14181c"),
    (REACH, "#1c3a50"),
    (LINKS_REACH, "#8a929b"),
    (KNEE_REACH, "#6db3e0"),
    (HIP_AXIS, "#8a929b"),
    (JOINT_RANGE, "#8d7426"),
    (WORK, "#f2a65a"),
    (WORST, "#ff77b7"),
    (ALLOWED, "#e4e9ee"),
    (VOID, "#22272d"),
    (UNREACHED, "#767e87"),
    (SERVO_RANGE, "#2e363e"),
    (SERVO_USED, "#5fa8d8"),
    (SCALE[0], "#172733"),
    (SCALE[1], "#1d3a50"),
    (SCALE[2], "#265172"),
    (SCALE[3], "#356a93"),
    (SCALE[4], "#4f87b2"),
    (SCALE[5], "#74a6cd"),
    (SCALE[6], "#a3c8e4"),
    (SCALE[7], "#dceefa"),
    (NUMBERS[0], "#56b4e9"),
    (NUMBERS[1], "#f08a4b"),
    (NUMBERS[2], "#2fc79b"),
    (NUMBERS[3], "#cdbb4a"),
    (NUMBERS[4], "#c79bd6"),
    (NUMBERS[5], "#5c646d"),
];

/// Lines that are dashed, in drawing units.
const DASHED: [(RGBColor, &str); 8] = [
    (LINKS_REACH, "28 18"),
    (KNEE_REACH, "6 14"),
    (HIP_AXIS, "44 12 8 12"),
    (ALLOWED, "20 14"),
    (NUMBERS[1], "40 14 8 14"),
    (NUMBERS[0], "22 16"),
    (NUMBERS[3], "30 8 8 8 8 8"),
    (NUMBERS[4], "10 10"),
];

/// A colour as plotters writes it into a drawing.
pub(super) fn hex(RGBColor(red, green, blue): RGBColor) -> String {
    format!("#{red:02X}{green:02X}{blue:02X}")
}

/// The rules for drawings in the page's style sheet; a hatching of the id `hatching` is the page's to define.
pub(in super::super) fn style() -> String {
    let mut css = String::new();
    for (colour, dashes) in DASHED {
        let _ = writeln!(css, "svg [stroke=\"{}\"] {{ stroke-dasharray: {dashes}; }}", hex(colour));
    }
    let _ = writeln!(css, "svg [fill=\"{}\"] {{ fill: url(#hatching); }}", hex(UNREACHED));
    let _ = writeln!(
        css,
        "svg text[fill=\"{}\"] {{ paint-order: stroke; stroke: {}; stroke-width: 14px; }}",
        hex(LABEL),
        hex(PAPER)
    );
    css.push_str("@media screen and (prefers-color-scheme: dark) {\n");
    for (colour, dark) in DARK {
        let light = hex(colour);
        if colour != UNREACHED {
            let _ = writeln!(css, "  svg [fill=\"{light}\"] {{ fill: {dark}; }}");
        }
        let _ = writeln!(css, "  svg [stroke=\"{light}\"] {{ stroke: {dark}; }}");
        if colour == PAPER {
            let _ = writeln!(css, "  svg text[fill=\"{}\"] {{ stroke: {dark}; }}", hex(LABEL));
        }
    }
    css.push_str("}\n");
    css
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::collections::BTreeSet;

    /// Relative luminance, as WCAG 2.2 defines it.
    fn luminance(hex: &str) -> f64 {
        let channel = |at: usize| {
            let share = f64::from(u8::from_str_radix(&hex[at..at + 2], 16).unwrap()) / 255.0;
            if share <= 0.04045 { share / 12.92 } else { ((share + 0.055) / 1.055).powf(2.4) }
        };
        0.2126 * channel(1) + 0.7152 * channel(3) + 0.0722 * channel(5)
    }

    fn contrast(a: &str, b: &str) -> f64 {
        let (a, b) = (luminance(a), luminance(b));
        (a.max(b) + 0.05) / (a.min(b) + 0.05)
    }

    fn dark(colour: RGBColor) -> &'static str {
        DARK.iter().find(|(light, _)| *light == colour).unwrap().1
    }

    #[test]
    fn a_colour_stands_for_one_thing() {
        let all: BTreeSet<_> = DARK.iter().map(|(colour, _)| hex(*colour)).collect();
        assert_eq!(all.len(), DARK.len());
    }

    #[test]
    fn text_and_lines_stand_out_from_the_paper() {
        // WCAG 2.2, success criteria 1.4.3 (text, 4.5) and 1.4.11 (graphics, 3).
        let (white, black) = (hex(PAPER), dark(PAPER));
        for (colour, least) in [(INK, 4.5), (LABEL, 4.5), (AXIS, 3.0), (LEG, 3.0), (KNEE_REACH, 3.0)]
            .into_iter()
            .chain([(LINKS_REACH, 3.0), (WORK, 3.0), (WORST, 3.0), (ALLOWED, 3.0), (SERVO_USED, 3.0)])
            .chain([(NUMBERS[0], 3.0), (NUMBERS[1], 3.0), (NUMBERS[2], 3.0), (NUMBERS[3], 3.0)])
            .chain([(NUMBERS[4], 3.0)])
        {
            assert!(contrast(&hex(colour), &white) >= least, "{} on light", hex(colour));
            assert!(contrast(dark(colour), black) >= least, "{} on dark", dark(colour));
        }
    }

    #[test]
    fn lightness_alone_orders_the_scale() {
        for pair in SCALE.windows(2) {
            assert!(luminance(&hex(pair[0])) > luminance(&hex(pair[1])), "light {}", hex(pair[1]));
            assert!(luminance(dark(pair[0])) < luminance(dark(pair[1])), "dark {}", dark(pair[1]));
        }
    }
}
