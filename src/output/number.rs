//! Rounding and unit text: the one place where a number becomes text.
//!
//! | for | figures | function |
//! |---|---|---|
//! | machines | 12 significant, nearest | [`rounded`], [`machine`] |
//! | machines, utilisation | 12 significant, upward | [`rounded_up`] |
//! | people | 4 significant, in the file's units | [`people`], [`quantity`], [`point`] |
//! | people, beside a printed number | decimals of the caller's choice, nearest | [`fixed`] |
//! | people, tolerance | 4 significant, as percents | [`share`] |
//! | people, utilisation | 3 decimals, upward | [`utilisation`] |
//! | drawings, coordinates | hundredths of a px | [`coordinate`] |
//!
//! Upward means that no utilisation above 1 is ever shown as 1. Zero never carries a sign. A missing value is
//! the caller's business: it stays empty (CSV), null (JSON) or a dash (people), never 0.

use crate::units::{Dimension, UnitSystem};

/// Shown to people where there is no number.
pub(super) const MISSING: &str = "-";

/// Figures kept for machines, less one.
const MACHINE_DECIMALS: usize = 11;
/// Figures kept for people, less one.
const PEOPLE_DECIMALS: i32 = 3;
/// A component smaller than this share of its vector is rounding noise to people.
const NOISE: f64 = 1e-9;
/// Relative excess over a printed step that is binary rounding, not engineering.
const BINARY_ROUNDING: f64 = 1e-12;

/// `value` to 12 significant digits; a signed zero loses its sign.
pub(super) fn rounded(value: f64) -> f64 {
    if !value.is_finite() {
        return value;
    }
    // The text of a finite number parses back; adding zero turns -0 into 0.
    format!("{value:.MACHINE_DECIMALS$e}").parse().unwrap_or(value) + 0.0
}

/// `value` to 12 significant digits, never below it: what its shortest decimal text says beyond the twelfth
/// digit counts upward.
pub(super) fn rounded_up(value: f64) -> f64 {
    let text = format!("{value:e}");
    let Some((mantissa, exponent)) = text.split_once('e') else { return rounded(value) };
    let digits: String = mantissa.chars().filter(char::is_ascii_digit).collect();
    if value <= 0.0 || digits.len() <= MACHINE_DECIMALS + 1 {
        return rounded(value);
    }
    let (kept, exponent) = (digits[..=MACHINE_DECIMALS].parse::<u64>(), exponent.parse::<i32>());
    match (kept, exponent) {
        (Ok(kept), Ok(exponent)) => format!("{}e{}", kept + 1, exponent - 11).parse().unwrap_or(value),
        _ => rounded(value),
    }
}

/// 12 significant digits for a table that a program reads; empty when there is no finite number.
pub(super) fn machine(value: f64) -> String {
    let value = rounded(value);
    if !value.is_finite() {
        String::new()
    } else if value == 0.0 || (1e-6..1e15).contains(&value.abs()) {
        format!("{value}")
    } else {
        format!("{value:e}")
    }
}

/// Four significant figures for people.
pub(super) fn people(value: f64) -> String {
    if !value.is_finite() {
        return MISSING.to_owned();
    }
    if value == 0.0 {
        return "0".to_owned();
    }
    let scientific = format!("{value:.3e}");
    let exponent = scientific.split_once('e').and_then(|(_, exponent)| exponent.parse::<i32>().ok());
    match exponent {
        Some(exponent @ -4..=6) => {
            let decimals = usize::try_from(PEOPLE_DECIMALS - exponent).unwrap_or(0);
            format!("{value:.decimals$}")
        }
        _ => scientific,
    }
}

/// Like [`people`], without the zeros that end a decimal fraction.
pub(super) fn trimmed(value: f64) -> String {
    let text = people(value);
    if text.contains('.') && !text.contains('e') {
        text.trim_end_matches('0').trim_end_matches('.').to_owned()
    } else {
        text
    }
}

/// A utilisation for people: three decimals, rounded up. One that counts as `exceeded` (the error estimate
/// of the analysis included) never reads as 1.000 or less.
pub(super) fn utilisation(value: f64, exceeded: bool) -> String {
    if !value.is_finite() {
        return MISSING.to_owned();
    }
    let thousandths = value * 1000.0;
    let nearest = thousandths.round();
    let noise = BINARY_ROUNDING * thousandths.abs();
    let up = if thousandths > nearest + noise { nearest + 1.0 } else { nearest };
    let shown = if exceeded { up.max(1001.0) } else { up };
    if shown < 1e6 { format!("{:.3}", shown / 1000.0) } else { format!("{:.3e}", shown / 1000.0) }
}

/// A share as percents with one decimal.
pub(super) fn percent(share: f64) -> String {
    format!("{:.1} %", (share * 100.0).abs())
}

/// A number with a given count of decimals, to stand beside another.
pub(super) fn fixed(value: f64, decimals: usize) -> String {
    if value.is_finite() { format!("{:.decimals$}", value + 0.0) } else { MISSING.to_owned() }
}

/// A count that need not be whole.
pub(super) fn count(value: f64) -> String {
    trimmed(value)
}

/// A share as percents of up to four figures; a very small one as it is.
pub(super) fn share(share: f64) -> String {
    if share < 1e-5 { format!("{share:e}") } else { format!("{} %", trimmed(share * 100.0)) }
}

/// Decimals beyond three figures of a step that are spent to show values exactly.
const MORE_DECIMALS: usize = 3;
/// Share of a step that counts as nothing.
const EXACT: f64 = 1e-9;

/// A residual or error: two figures.
pub(super) fn small(value: f64) -> String {
    if value == 0.0 { "0".to_owned() } else { format!("{value:.1e}") }
}

/// The unit of a dimension with a power, for example `mm4`.
pub(super) fn power_of_length(units: UnitSystem, power: i32) -> (f64, String) {
    let factor = units.factor(Dimension::Length).powi(power);
    (factor, format!("{}{power}", units.symbol(Dimension::Length)))
}

/// A number with its unit for people.
pub(super) fn quantity(units: UnitSystem, dimension: Dimension, value: f64) -> String {
    format!("{} {}", people(units.shown(dimension, value)), units.symbol(dimension)).trim_end().to_owned()
}

/// The dimension of a strength, which is told as a force or as a moment.
pub(super) fn measure(in_moment: bool) -> Dimension {
    if in_moment { Dimension::Moment } else { Dimension::Force }
}

/// A length for people, without zeros at the end.
pub(super) fn length(units: UnitSystem, value: f64) -> String {
    format!("{} {}", trimmed(units.shown(Dimension::Length, value)), units.symbol(Dimension::Length))
}

/// The leg of a weld for people: in the US system sixteenths of an inch as a fraction, as drawings have them.
pub(super) fn leg(units: UnitSystem, value: f64) -> String {
    let sixteenths = units.shown(Dimension::Length, value) * 16.0;
    let whole = sixteenths.round();
    let is_fraction = units == UnitSystem::Us
        && (sixteenths - whole).abs() <= NOISE * whole
        && (1.0..=32.0).contains(&whole);
    if !is_fraction {
        return length(units, value);
    }
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // between 1 and 32
    let mut top = whole as u32;
    let mut bottom = 16;
    while top.is_multiple_of(2) && bottom > 1 {
        (top, bottom) = (top / 2, bottom / 2);
    }
    let unit = units.symbol(Dimension::Length);
    match (top / bottom, top % bottom) {
        (whole, 0) => format!("{whole} {unit}"),
        (0, top) => format!("{top}/{bottom} {unit}"),
        (whole, top) => format!("{whole} {top}/{bottom} {unit}"),
    }
}

/// Components with their unit, `(0, -60) kN`; the third is left out when it is zero.
pub(super) fn point(units: UnitSystem, dimension: Dimension, components: &[f64]) -> String {
    let scale = components.iter().fold(0.0_f64, |largest, component| largest.max(component.abs()));
    let calm = |component: f64| if component.abs() <= NOISE * scale { 0.0 } else { component };
    let mut shown: Vec<f64> = components.iter().map(|component| calm(*component)).collect();
    if shown.len() == 3 && shown[2] == 0.0 {
        shown.truncate(2);
    }
    let texts: Vec<String> =
        shown.iter().map(|component| trimmed(units.shown(dimension, *component))).collect();
    format!("({}) {}", texts.join(", "), units.symbol(dimension))
}

/// A coordinate of a drawing in px: hundredths, without zeros at the end.
pub(super) fn coordinate(value: f64) -> String {
    let hundredths = (value * 100.0).round() / 100.0 + 0.0;
    if hundredths.is_finite() { format!("{hundredths}") } else { "0".to_owned() }
}

/// Values of a variable for people: as many decimals as tell values a `step` apart to three figures, without
/// the zeros that all of them end with.
pub(super) fn graded(values: &[f64], step: f64) -> Vec<String> {
    let step = step.abs();
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // clamped
    let three_figures = if step > 0.0 { (2.0 - step.log10().floor()).clamp(0.0, 15.0) as usize } else { 0 };
    // A few decimals more where they say the values exactly: 132.5 is not shown as 132.
    let is_exact = |decimals: &usize| {
        let error = |value: &f64| {
            format!("{value:.decimals$}").parse::<f64>().map_or(f64::INFINITY, |text| (text - value).abs())
        };
        values.iter().all(|value| error(value) <= EXACT * step)
    };
    let decimals = (three_figures..=three_figures + MORE_DECIMALS).find(is_exact).unwrap_or(three_figures);
    // Adding zero turns a rounded -0 into 0.
    let rounded =
        |value: &f64| format!("{value:.decimals$}").parse::<f64>().map_or(*value, |value| value + 0.0);
    let texts: Vec<String> = values.iter().map(|value| format!("{:.decimals$}", rounded(value))).collect();
    let zeros = |text: &String| text.len() - text.trim_end_matches('0').len();
    let cut = if decimals == 0 { 0 } else { texts.iter().map(zeros).min().unwrap_or(0).min(decimals) };
    texts.iter().map(|text| text[..text.len() - cut].trim_end_matches('.').to_owned()).collect()
}

/// An angle in degrees for people.
pub(super) fn degrees(angle: f64) -> String {
    format!("{:.1} deg", angle.to_degrees())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn legs_in_inches_are_fractions() {
        let inch = crate::units::MM_PER_INCH;
        for (size, words) in
            [(0.3125, "5/16 in"), (0.25, "1/4 in"), (1.0, "1 in"), (1.375, "1 3/8 in"), (0.3, "0.3 in")]
        {
            assert_eq!(leg(UnitSystem::Us, size * inch), words);
        }
        assert_eq!(leg(UnitSystem::Metric, 0.25 * inch), "6.35 mm");
    }

    #[test]
    fn a_utilisation_above_one_never_reads_as_one() {
        assert_eq!(utilisation(1.000_000_1, true), "1.001");
        assert_eq!(utilisation(1.000_000_1, false), "1.001");
        assert_eq!(utilisation(0.999_999_999_9, true), "1.001");
        assert_eq!(utilisation(1.0, false), "1.000");
    }

    #[test]
    fn a_utilisation_is_rounded_up() {
        assert_eq!(utilisation(0.9412, false), "0.942");
        assert_eq!(utilisation(0.000_01, false), "0.001");
        assert_eq!(utilisation(0.0, false), "0.000");
    }

    #[test]
    fn binary_rounding_does_not_push_a_utilisation_up() {
        assert_eq!(utilisation(0.6, false), "0.600");
        assert_eq!(utilisation(0.1 + 0.2, false), "0.300");
        assert_eq!(utilisation(0.9, false), "0.900");
    }

    #[test]
    fn machines_get_twelve_digits() {
        assert_eq!(machine(std::f64::consts::PI), "3.14159265359");
        assert_eq!(machine(1.0 / 3.0), "0.333333333333");
        assert_eq!(machine(-0.0), "0");
        assert_eq!(machine(1e-17), "1e-17");
        assert_eq!(machine(f64::NAN), "");
    }

    #[test]
    fn machines_get_a_utilisation_that_is_never_below_the_true_one() {
        let up = |value: f64| machine(rounded_up(value));
        assert_eq!(up(1.000_000_000_000_000_2), "1.00000000001");
        assert_eq!(up(0.5), "0.5");
        assert_eq!(up(1.0 / 3.0), "0.333333333334");
        assert_eq!(up(0.999_999_999_999_9), "1");
        assert_eq!(up(0.0), "0");
    }

    #[test]
    fn people_get_four_figures() {
        assert_eq!(people(0.941_234), "0.9412");
        assert_eq!(people(999.96), "1000");
        assert_eq!(people(99.996), "100.0");
        assert_eq!(people(123_456.7), "123457");
        assert_eq!(people(1.5e9), "1.500e9");
        assert_eq!(people(0.000_001_234), "1.234e-6");
        assert_eq!(people(-0.0), "0");
    }

    #[test]
    fn tolerances_keep_their_figures() {
        assert_eq!([share(0.006), share(0.006_819_812_3), share(2e-7)], ["0.6 %", "0.682 %", "2e-7"]);
        assert_eq!([count(0.500_000_001), count(1.207_106_8)], ["0.5", "1.207"]);
        assert_eq!([fixed(1.871_86, 3), fixed(333.333, 1), fixed(-0.0, 1)], ["1.872", "333.3", "0.0"]);
        assert_eq!(fixed(f64::NAN, 2), "-");
    }

    #[test]
    fn quantities_carry_the_unit_of_the_file() {
        assert_eq!(quantity(UnitSystem::Metric, Dimension::Force, 60_000.0), "60.00 kN");
        assert_eq!(quantity(UnitSystem::Us, Dimension::Length, 25.4), "1.000 in");
        assert_eq!(length(UnitSystem::Us, 12.7), "0.5 in");
        assert_eq!(power_of_length(UnitSystem::Metric, 4).1, "mm4");
    }

    #[test]
    fn values_of_a_variable_show_their_step() {
        assert_eq!(graded(&[150.0, 200.0, -0.0], 50.0), ["150", "200", "0"]);
        assert_eq!(graded(&[1000.0, 1000.25, 1000.5], 0.25), ["1000.00", "1000.25", "1000.50"]);
        assert_eq!(graded(&[0.0, 100.0 / 3.0], 100.0 / 3.0), ["0.0", "33.3"]);
        assert_eq!(graded(&[-1e-17, 2.4287166], 0.1), ["0.000", "2.429"]);
        assert_eq!(graded(&[10.0, 132.5, 255.0], 122.5), ["10.0", "132.5", "255.0"]);
    }

    #[test]
    fn noise_beside_a_large_component_is_zero() {
        let force = [6.1e-12, -60_000.0, 0.0];
        assert_eq!(point(UnitSystem::Metric, Dimension::Force, &force), "(0, -60) kN");
    }
}
