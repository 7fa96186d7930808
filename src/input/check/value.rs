//! Numbers of the file to numbers in the inside units, with dimension and range checked.

use super::super::dimension::{Exponents, name};
use super::super::faults::{Faults, Origin};
use super::super::field::{Content, Field};
use super::super::parameters::Parameters;
use super::super::quantity::{Quantity, example, number, shown};
use crate::model::{LARGEST_LENGTH, LARGEST_STRENGTH, SMALLEST_LENGTH};
use crate::units::{Dimension, UnitSystem};

/// The units of the file and the values of its parameters.
pub(super) struct Values<'p> {
    units: UnitSystem,
    parameters: &'p Parameters,
}

impl<'p> Values<'p> {
    pub(super) fn new(units: UnitSystem, parameters: &'p Parameters) -> Self {
        Self { units, parameters }
    }

    /// Whether a name is a parameter.
    pub(super) fn is_parameter(&self, name: &str) -> bool {
        self.parameters.names().contains(&name)
    }

    /// A value as people read it.
    pub(super) fn shown(&self, dimension: Dimension, value: f64) -> String {
        shown(self.units, dimension, value)
    }

    /// A number of this dimension, in the inside units.
    pub(super) fn number(&self, field: &Field, dimension: Dimension, faults: &mut Faults<'_>) -> Option<f64> {
        match &field.content {
            Content::Bare(bare) => {
                let value = self.units.inside(dimension, *bare);
                if value.is_finite() {
                    return Some(value);
                }
                faults.at(&field.origin, format!("{} is too large, found {}", field.name, number(*bare)));
                None
            }
            Content::Expression(expression) => {
                let quantity = self.parameters.value(expression, faults)?;
                if quantity.exponents == Exponents::of(dimension) {
                    return Some(quantity.value);
                }
                self.wrong_dimension(field, dimension, quantity, faults);
                None
            }
            Content::Faulty => None,
        }
    }

    fn wrong_dimension(&self, field: &Field, dimension: Dimension, found: Quantity, faults: &mut Faults<'_>) {
        let message = format!("{} must be {}, found {}", field.name, name(dimension), found.exponents.name());
        let accepted = format!("{}, for example `{}`", name(dimension), example(self.units, dimension));
        let hint = (found.exponents == Exponents::PURE).then(|| {
            let unit = self.units.symbol(dimension);
            format!("a text carries its unit; a number without quotes is in {unit}")
        });
        faults.at(&field.origin, message).accepted(accepted).hint_if(hint);
    }

    /// A number from `low` (above zero) to `high`.
    fn positive(
        &self,
        field: &Field,
        dimension: Dimension,
        (low, high): (f64, f64),
        faults: &mut Faults<'_>,
    ) -> Option<f64> {
        let value = self.number(field, dimension, faults)?;
        let found = self.shown(dimension, value);
        if value <= 0.0 {
            faults.at(&field.origin, format!("{} must be greater than zero, found {found}", field.name));
            return None;
        }
        self.inside(&field.origin, &field.name, dimension, value, (low, high), faults)
    }

    fn inside(
        &self,
        origin: &Origin,
        name: &str,
        dimension: Dimension,
        value: f64,
        (low, high): (f64, f64),
        faults: &mut Faults<'_>,
    ) -> Option<f64> {
        if value >= low && value <= high {
            return Some(value);
        }
        let size = if value.abs() < high { "small" } else { "large" };
        let found = self.shown(dimension, value);
        let range = format!("{} to {}", self.shown(dimension, low), self.shown(dimension, high));
        faults.at(origin, format!("{name} is too {size}, found {found}")).accepted(range);
        None
    }

    /// A length of a weld or plate.
    pub(super) fn size(&self, field: &Field, faults: &mut Faults<'_>) -> Option<f64> {
        self.positive(field, Dimension::Length, (SMALLEST_LENGTH, LARGEST_LENGTH), faults)
    }

    /// A strength of a material.
    pub(super) fn strength(&self, field: &Field, faults: &mut Faults<'_>) -> Option<f64> {
        self.positive(field, Dimension::Stress, (1.0, LARGEST_STRENGTH), faults)
    }

    /// A number of either sign, at most `largest` in size.
    pub(super) fn limited(
        &self,
        field: &Field,
        dimension: Dimension,
        largest: f64,
        faults: &mut Faults<'_>,
    ) -> Option<f64> {
        let value = self.number(field, dimension, faults)?;
        self.inside(&field.origin, &field.name, dimension, value, (-largest, largest), faults)
    }

    /// A number from `low` to `high`, both given in the file's unit (degrees for angles).
    pub(super) fn between(
        &self,
        field: &Field,
        dimension: Dimension,
        (low, high): (f64, f64),
        faults: &mut Faults<'_>,
    ) -> Option<f64> {
        let value = self.number(field, dimension, faults)?;
        let given = self.units.shown(dimension, value);
        // The slack is for an angle given in radians.
        let slack = 1e-9;
        if given >= low - slack && given <= high + slack {
            return Some(value);
        }
        let unit = self.units.symbol(dimension);
        let message = format!("{} is out of range, found {}", field.name, self.shown(dimension, value));
        faults.at(&field.origin, message).accepted(format!("{low} to {high} {unit}").trim().to_owned());
        None
    }

    /// A whole number from `low` to `high`.
    pub(super) fn whole(
        &self,
        field: &Field,
        low: usize,
        high: usize,
        faults: &mut Faults<'_>,
    ) -> Option<usize> {
        let value = self.number(field, Dimension::Pure, faults)?;
        #[allow(clippy::cast_precision_loss)] // far below 2^53
        let inside = value.fract().abs() <= 0.0 && value >= low as f64 && value <= high as f64;
        if inside {
            #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // whole and within the range
            return Some(value as usize);
        }
        let message = format!("{} must be a whole number in its range, found {}", field.name, number(value));
        faults.at(&field.origin, message).accepted(format!("{low} to {high}"));
        None
    }
}
