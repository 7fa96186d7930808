//! Colours: a small set that tells things apart for every eye, and in grey.
//!
//! The two methods are a dark blue and a light orange; the deformation ramp goes from pale straw to dark blue with
//! steadily falling lightness, so that it is read the same in grey. What matters has a shape or a word besides.
//!
//! Lightness: `L = 0.2126 R' + 0.7152 G' + 0.0722 B'` of the linear components. Source: IEC 61966-2-1 (sRGB).

use super::count::as_float;

/// A colour in sRGB.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Ink(pub(super) [u8; 3]);

impl Ink {
    /// The page.
    pub(super) const PAPER: Self = Self([0xff, 0xff, 0xff]);
    /// Text and outlines.
    pub(super) const TEXT: Self = Self([0x1b, 0x22, 0x2c]);
    /// Secondary text, dimensions.
    pub(super) const QUIET: Self = Self([0x55, 0x5e, 0x6b]);
    /// Rules and grids.
    pub(super) const HAIR: Self = Self([0xcf, 0xd4, 0xda]);
    /// Background of a panel.
    pub(super) const WASH: Self = Self([0xf5, 0xf6, 0xf4]);
    /// The ultimate method.
    pub(super) const ULTIMATE: Self = Self([0x16, 0x3f, 0x73]);
    /// The elastic method.
    pub(super) const ELASTIC: Self = Self([0xe8, 0x9a, 0x3c]);
    /// The peak on the path from zero load.
    pub(super) const PEAK: Self = Self([0x6f, 0x92, 0xb8]);
    /// Loads.
    pub(super) const LOAD: Self = Self([0x7a, 0x1f, 0x4b]);
    /// A verification that holds.
    pub(super) const SATISFIED: Self = Self([0x1d, 0x6b, 0x52]);
    /// A verification that does not hold; first rupture.
    pub(super) const EXCEEDED: Self = Self([0xb3, 0x26, 0x1e]);
    /// No answer; welds without a value.
    pub(super) const UNKNOWN: Self = Self([0x8c, 0x93, 0x9c]);

    /// As SVG writes it.
    pub(super) fn hex(self) -> String {
        let [r, g, b] = self.0;
        format!("#{r:02x}{g:02x}{b:02x}")
    }

    /// Mixed with another colour, `share` of it.
    fn mixed(self, other: Self, share: f64) -> Self {
        let component = |index: usize| {
            let (from, to) = (f64::from(self.0[index]), f64::from(other.0[index]));
            // Between two bytes, so a byte.
            #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)]
            let mixed = (from + (to - from) * share).round() as u8;
            mixed
        };
        Self([component(0), component(1), component(2)])
    }
}

/// Anchors of the ramp, equally spaced.
const RAMP: [Ink; 5] = [
    Ink([0xf4, 0xee, 0xcb]),
    Ink([0xb5, 0xd6, 0xb2]),
    Ink([0x58, 0xa6, 0xa6]),
    Ink([0x29, 0x67, 0x8f]),
    Ink([0x15, 0x1f, 0x4f]),
];

/// The colour of a share between 0 (pale) and 1 (dark).
pub(super) fn ramp(share: f64) -> Ink {
    let last = RAMP.len() - 1;
    let place = share.clamp(0.0, 1.0) * as_float(last);
    let mut below = 0;
    while below + 1 < last && as_float(below + 1) <= place {
        below += 1;
    }
    RAMP[below].mixed(RAMP[below + 1], place - as_float(below))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Linear components.
    fn linear(ink: Ink) -> [f64; 3] {
        ink.0.map(|byte| {
            let value = f64::from(byte) / 255.0;
            if value <= 0.040_45 { value / 12.92 } else { ((value + 0.055) / 1.055).powf(2.4) }
        })
    }

    fn luminance(ink: Ink) -> f64 {
        let [r, g, b] = linear(ink);
        0.2126 * r + 0.7152 * g + 0.0722 * b
    }

    /// CIE lightness, 0 to 100.
    fn lightness(ink: Ink) -> f64 {
        116.0 * luminance(ink).cbrt() - 16.0
    }

    /// How a dichromat sees linear components. Source: Viénot, Brettel and Mollon, Color Research and Application 24
    /// (1999), matrices in linear RGB as commonly restated (memory).
    fn dichromat(ink: Ink, red_blind: bool) -> [f64; 3] {
        let [r, g, b] = linear(ink);
        if red_blind {
            [0.112_38 * r + 0.887_62 * g, 0.112_38 * r + 0.887_62 * g, 0.004_01 * r - 0.004_01 * g + b]
        } else {
            [0.292_75 * r + 0.707_25 * g, 0.292_75 * r + 0.707_25 * g, -0.022_34 * r + 0.022_34 * g + b]
        }
    }

    #[test]
    fn the_ramp_darkens_steadily() {
        let mut before = lightness(ramp(0.0));
        for step in 1..=50 {
            let now = lightness(ramp(f64::from(step) / 50.0));
            assert!(now < before - 0.5, "step {step}: {now} after {before}");
            before = now;
        }
        assert_eq!(ramp(-1.0), ramp(0.0));
        assert_eq!(ramp(2.0), ramp(1.0));
    }

    #[test]
    fn the_two_methods_differ_in_grey() {
        assert!(lightness(Ink::ELASTIC) - lightness(Ink::ULTIMATE) > 35.0);
        assert!(lightness(Ink::PEAK) - lightness(Ink::ULTIMATE) > 25.0);
    }

    #[test]
    fn the_two_methods_and_the_loads_differ_for_dichromats() {
        for red_blind in [true, false] {
            let distance = |a: Ink, b: Ink| {
                let (a, b) = (dichromat(a, red_blind), dichromat(b, red_blind));
                a.iter()
                    .zip(b)
                    .map(|(a, b)| (a.max(0.0).sqrt() - b.max(0.0).sqrt()).powi(2))
                    .sum::<f64>()
                    .sqrt()
            };
            assert!(distance(Ink::ULTIMATE, Ink::ELASTIC) > 0.3);
            assert!(distance(Ink::ELASTIC, Ink::LOAD) > 0.3);
        }
    }

    #[test]
    fn texts_stand_out_from_the_page() {
        // WCAG 2.1, success criterion 1.4.3: at least 4.5 to 1.
        for ink in [Ink::TEXT, Ink::QUIET, Ink::ULTIMATE, Ink::LOAD, Ink::SATISFIED, Ink::EXCEEDED] {
            for paper in [Ink::PAPER, Ink::WASH] {
                assert!((luminance(paper) + 0.05) / (luminance(ink) + 0.05) > 4.5, "{}", ink.hex());
            }
        }
    }
}
