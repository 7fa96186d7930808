//! A quantity: a number in the inside units (N, mm, rad and their products) with its dimension; and the
//! names of units.
//!
//! | unit | inside | | unit | inside |
//! |---|---|---|---|---|
//! | mm, cm, m | 1, 10, 1000 mm | | Pa, kPa, MPa, GPa | 1e-6, 1e-3, 1, 1000 N/mm^2 |
//! | in, ft | 25.4, 304.8 mm | | psi, ksi | 1 lbf/in^2, 1000 lbf/in^2 |
//! | N, kN, MN | 1, 1e3, 1e6 N | | deg | pi/180 rad |
//! | lbf, kip | 4.448 221 615 260 5 N, 1000 times that | | rad | 1 rad |
//!
//! The exact basic factors and their source are in `units`.

use super::dimension::Exponents;
use crate::units::{Dimension, MM_PER_INCH, MPA_PER_KSI, N_PER_KIP, N_PER_LBF, UnitSystem};

/// A number with its dimension.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Quantity {
    /// In N, mm, rad and their products.
    pub(super) value: f64,
    /// Its dimension.
    pub(super) exponents: Exponents,
}

impl Quantity {
    /// A pure number.
    pub(super) const fn pure(value: f64) -> Self {
        Self { value, exponents: Exponents::PURE }
    }

    /// A number of the file's units.
    #[cfg(test)]
    pub(super) fn of(units: UnitSystem, dimension: Dimension, value: f64) -> Self {
        Self { value: units.inside(dimension, value), exponents: Exponents::of(dimension) }
    }
}

const UNITS: [(&str, f64, Exponents); 18] = [
    ("mm", 1.0, Exponents::LENGTH),
    ("cm", 10.0, Exponents::LENGTH),
    ("m", 1000.0, Exponents::LENGTH),
    ("in", MM_PER_INCH, Exponents::LENGTH),
    ("ft", 304.8, Exponents::LENGTH),
    ("N", 1.0, Exponents::FORCE),
    ("kN", 1e3, Exponents::FORCE),
    ("MN", 1e6, Exponents::FORCE),
    ("lbf", N_PER_LBF, Exponents::FORCE),
    ("kip", N_PER_KIP, Exponents::FORCE),
    ("Pa", 1e-6, Exponents::STRESS),
    ("kPa", 1e-3, Exponents::STRESS),
    ("MPa", 1.0, Exponents::STRESS),
    ("GPa", 1e3, Exponents::STRESS),
    ("psi", MPA_PER_KSI / 1000.0, Exponents::STRESS),
    ("ksi", MPA_PER_KSI, Exponents::STRESS),
    ("deg", std::f64::consts::PI / 180.0, Exponents::ANGLE),
    ("rad", 1.0, Exponents::ANGLE),
];

/// One unit of this name, if there is such a unit.
pub(super) fn unit(name: &str) -> Option<Quantity> {
    UNITS
        .iter()
        .find(|(known, _, _)| *known == name)
        .map(|(_, value, exponents)| Quantity { value: *value, exponents: *exponents })
}

/// The names of all units.
pub(super) fn unit_names() -> [&'static str; 18] {
    UNITS.map(|(name, _, _)| name)
}

/// A force and a length written without a space between them: `kNm` is `kN m`.
pub(super) fn split_unit(name: &str) -> Option<(&str, &str)> {
    (1..name.len()).filter(|at| name.is_char_boundary(*at)).map(|at| name.split_at(at)).find(
        |(first, second)| {
            unit(first).is_some_and(|unit| unit.exponents == Exponents::FORCE)
                && unit(second).is_some_and(|unit| unit.exponents == Exponents::LENGTH)
        },
    )
}

/// An example of a quantity of this dimension, for messages.
pub(super) fn example(units: UnitSystem, dimension: Dimension) -> String {
    match dimension {
        Dimension::Pure => "1.5".to_owned(),
        Dimension::Angle => "30 deg".to_owned(),
        Dimension::Length
        | Dimension::Force
        | Dimension::Moment
        | Dimension::Stress
        | Dimension::LineForce => format!("12 {}", units.symbol(dimension)),
    }
}

/// A value (inside units) as people read it in the file's units: at most 10 digits, no digits without end.
pub(super) fn shown(units: UnitSystem, dimension: Dimension, value: f64) -> String {
    let number = number(units.shown(dimension, value));
    match units.symbol(dimension) {
        "" => number,
        symbol => format!("{number} {symbol}"),
    }
}

/// A number with at most 10 significant digits, in powers of ten where it is very large or small.
pub(super) fn number(value: f64) -> String {
    let size = value.abs();
    if !value.is_finite() || size == 0.0 {
        return format!("{value}");
    }
    let rounded: f64 = format!("{value:.9e}").parse().unwrap_or(value);
    if (1e-4..1e7).contains(&size) { format!("{rounded}") } else { format!("{rounded:e}") }
}

#[cfg(test)]
#[allow(clippy::float_cmp)] // exact factors are meant exactly
mod tests {
    use super::*;

    #[test]
    fn factors_are_exact() {
        for (name, value) in [("in", 25.4), ("ft", 304.8), ("kN", 1000.0), ("m", 1000.0), ("GPa", 1000.0)] {
            assert_eq!(unit(name).unwrap().value, value, "{name}");
        }
        assert_eq!(unit("kip").unwrap().value, 4_448.221_615_260_5);
        assert_eq!(unit("ksi").unwrap().value, 4_448.221_615_260_5 / (25.4 * 25.4));
        assert_eq!(unit("deg").unwrap().value * 180.0, std::f64::consts::PI);
        assert_eq!(unit("ton"), None);
        assert_eq!(unit_names()[17], "rad");
    }

    #[test]
    fn the_units_of_the_file_agree_with_the_named_units() {
        assert_eq!(Quantity::of(UnitSystem::Us, Dimension::Length, 3.0).value, 3.0 * 25.4);
        assert_eq!(unit("kip").unwrap(), Quantity::of(UnitSystem::Us, Dimension::Force, 1.0));
        assert_eq!(unit("ksi").unwrap(), Quantity::of(UnitSystem::Us, Dimension::Stress, 1.0));
    }

    #[test]
    fn joined_units_are_split() {
        assert_eq!(split_unit("kNm"), Some(("kN", "m")));
        assert_eq!(split_unit("Nmm"), Some(("N", "mm")));
        assert_eq!(split_unit("kN"), None);
        assert_eq!(split_unit("mmm"), None);
        assert_eq!(split_unit("é"), None);
    }

    #[test]
    fn numbers_are_short() {
        assert_eq!(number(0.1 + 0.2), "0.3");
        assert_eq!(number(1e308), "1e308");
        assert_eq!(number(-3.0), "-3");
        assert_eq!(number(0.0), "0");
        assert_eq!(shown(UnitSystem::Us, Dimension::Length, 12.7), "0.5 in");
        assert_eq!(shown(UnitSystem::Metric, Dimension::Pure, 2.0), "2");
    }
}
