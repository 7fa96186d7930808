//! Dimensions of quantities as exponents, and the names people give them.
//!
//! | dimension | length | force | angle |
//! |---|---|---|---|
//! | pure number | 0 | 0 | 0 |
//! | length | 1 | 0 | 0 |
//! | force | 0 | 1 | 0 |
//! | moment | 1 | 1 | 0 |
//! | stress | -2 | 1 | 0 |
//! | force per length | -1 | 1 | 0 |
//! | angle | 0 | 0 | 1 |
//!
//! An angle is kept apart from a pure number, so that `sin(30)` is a fault and `sin(30 deg)` is not.

use crate::units::{Dimension, UnitSystem};

/// Largest exponent that an intermediate result may have.
const LARGEST: i32 = 99;

/// Exponents of length, force and angle.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Exponents {
    length: i32,
    force: i32,
    angle: i32,
}

impl Exponents {
    /// A pure number.
    pub(super) const PURE: Self = Self { length: 0, force: 0, angle: 0 };
    /// A length.
    pub(super) const LENGTH: Self = Self { length: 1, force: 0, angle: 0 };
    /// A force.
    pub(super) const FORCE: Self = Self { length: 0, force: 1, angle: 0 };
    /// A stress.
    pub(super) const STRESS: Self = Self { length: -2, force: 1, angle: 0 };
    /// An angle.
    pub(super) const ANGLE: Self = Self { length: 0, force: 0, angle: 1 };

    /// The exponents of a dimension.
    pub(super) const fn of(dimension: Dimension) -> Self {
        match dimension {
            Dimension::Pure => Self::PURE,
            Dimension::Length => Self::LENGTH,
            Dimension::Force => Self::FORCE,
            Dimension::Moment => Self { length: 1, force: 1, angle: 0 },
            Dimension::Stress => Self::STRESS,
            Dimension::Angle => Self::ANGLE,
            Dimension::LineForce => Self { length: -1, force: 1, angle: 0 },
        }
    }

    /// The exponents of a product with `other` to the power `power`; `None` beyond any use.
    pub(super) fn times(self, other: Self, power: i32) -> Option<Self> {
        let sum = |a: i32, b: i32| {
            b.checked_mul(power).and_then(|b| a.checked_add(b)).filter(|sum| sum.abs() <= LARGEST)
        };
        Some(Self {
            length: sum(self.length, other.length)?,
            force: sum(self.force, other.force)?,
            angle: sum(self.angle, other.angle)?,
        })
    }

    /// The exponents of the square root; `None` when one is odd.
    pub(super) fn root(self) -> Option<Self> {
        let half = |exponent: i32| (exponent % 2 == 0).then_some(exponent / 2);
        Some(Self { length: half(self.length)?, force: half(self.force)?, angle: half(self.angle)? })
    }

    /// What people call it, with its article.
    pub(super) fn name(self) -> String {
        if let Some(dimension) = self.dimension() {
            return name(dimension).to_owned();
        }
        if self == (Self { length: 2, force: 0, angle: 0 }) {
            return "an area".to_owned();
        }
        format!("a quantity in {}", self.product(["N", "mm", "rad"]))
    }

    /// The dimension with these exponents, if it has a name.
    pub(super) fn dimension(self) -> Option<Dimension> {
        DIMENSIONS.into_iter().find(|dimension| self == Self::of(*dimension))
    }

    /// Symbol of the file's unit, and how many inside units it holds.
    pub(super) fn unit(self, units: UnitSystem) -> (String, f64) {
        if let Some(dimension) = self.dimension() {
            return (units.symbol(dimension).to_owned(), units.factor(dimension));
        }
        let basic = [Dimension::Force, Dimension::Length, Dimension::Angle];
        let [force, length, angle] = basic.map(|dimension| units.factor(dimension));
        let factor = force.powi(self.force) * length.powi(self.length) * angle.powi(self.angle);
        (self.product(basic.map(|dimension| units.symbol(dimension))), factor)
    }

    /// Symbol of the inside unit.
    pub(super) fn inside_unit(self) -> String {
        match self.dimension() {
            Some(Dimension::Stress) => "MPa".to_owned(),
            Some(Dimension::LineForce) => "N/mm".to_owned(),
            Some(
                Dimension::Pure | Dimension::Length | Dimension::Force | Dimension::Moment | Dimension::Angle,
            )
            | None => self.product(["N", "mm", "rad"]),
        }
    }

    /// A product of units of force, length and angle with these exponents.
    fn product(self, symbols: [&str; 3]) -> String {
        let mut factors = Vec::new();
        for (exponent, symbol) in [self.force, self.length, self.angle].into_iter().zip(symbols) {
            match exponent {
                0 => {}
                1 => factors.push(symbol.to_owned()),
                _ => factors.push(format!("{symbol}^{exponent}")),
            }
        }
        factors.join(" ")
    }
}

/// The dimensions that have a name.
const DIMENSIONS: [Dimension; 7] = [
    Dimension::Pure,
    Dimension::Length,
    Dimension::Force,
    Dimension::Moment,
    Dimension::Stress,
    Dimension::Angle,
    Dimension::LineForce,
];

/// What people call a dimension, with its article.
pub(super) fn name(dimension: Dimension) -> &'static str {
    match dimension {
        Dimension::Pure => "a pure number",
        Dimension::Length => "a length",
        Dimension::Force => "a force",
        Dimension::Moment => "a moment",
        Dimension::Stress => "a stress",
        Dimension::Angle => "an angle",
        Dimension::LineForce => "a force per length",
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn products_and_roots_add_and_halve() {
        let moment = Exponents::FORCE.times(Exponents::LENGTH, 1).unwrap();
        assert_eq!(moment, Exponents::of(Dimension::Moment));
        assert_eq!(Exponents::FORCE.times(Exponents::LENGTH, -2).unwrap(), Exponents::STRESS);
        let area = Exponents::PURE.times(Exponents::LENGTH, 2).unwrap();
        assert_eq!(area.root().unwrap(), Exponents::LENGTH);
        assert_eq!(Exponents::LENGTH.root(), None);
    }

    #[test]
    fn exponents_beyond_use_are_refused() {
        assert!(Exponents::PURE.times(Exponents::LENGTH, 99).is_some());
        assert!(Exponents::PURE.times(Exponents::LENGTH, 100).is_none());
        assert!(Exponents::PURE.times(Exponents::STRESS, i32::MAX).is_none());
    }

    #[test]
    fn units_follow_the_file_and_odd_ones_are_products() {
        let stress = Exponents::STRESS;
        assert_eq!((stress.unit(UnitSystem::Us).0.as_str(), stress.inside_unit().as_str()), ("ksi", "MPa"));
        let area = Exponents::PURE.times(Exponents::LENGTH, 2).unwrap();
        assert_eq!(area.unit(UnitSystem::Us), ("in^2".to_owned(), 25.4 * 25.4));
        assert_eq!(area.inside_unit(), "mm^2");
        assert_eq!(Exponents::of(Dimension::Moment).inside_unit(), "N mm");
        assert_eq!(Exponents::PURE.inside_unit(), "");
    }

    #[test]
    fn names_are_those_people_use() {
        assert_eq!(Exponents::PURE.name(), "a pure number");
        assert_eq!(Exponents::ANGLE.name(), "an angle");
        assert_eq!(Exponents::PURE.times(Exponents::LENGTH, 2).unwrap().name(), "an area");
        assert_eq!(Exponents::FORCE.times(Exponents::LENGTH, 3).unwrap().name(), "a quantity in N mm^3");
    }
}
