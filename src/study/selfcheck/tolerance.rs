//! How far a computed value may be from a printed one, and why: data, read from `data/cases/tolerances.toml`.
//!
//! | symbol | code | meaning |
//! |---|---|---|
//! | p | `Printed::value` | the printed value |
//! | u | `Printed::last_digit` | one unit of its last printed digit |
//! | d | `Tolerance::allowed` | greatest difference: `x p` (relative) or `x u` (units of the last digit) |
//!
//! Every row of the cases belongs to exactly one tolerance, by its method, reading and quantity.

use super::quantity::{Method, Quantity, Reading};
use serde::Deserialize;

/// A number as it is printed: its digits say how far it is rounded.
#[derive(Debug, Clone, PartialEq)]
pub struct Printed {
    /// The digits.
    pub text: String,
    /// Their value.
    pub value: f64,
    /// How many of them stand behind the point.
    pub decimals: usize,
}

impl Printed {
    /// The number of these digits; `None` for anything but digits around at most one point, or for zero.
    #[must_use]
    pub fn read(text: &str) -> Option<Self> {
        let (whole, decimals) = text.split_once('.').unwrap_or((text, ""));
        let digits = |part: &str| part.chars().all(|character| character.is_ascii_digit());
        let value: f64 = text.parse().ok()?;
        let plain = !whole.is_empty() && digits(whole) && digits(decimals) && value.is_finite();
        (plain && value > 0.0).then(|| Self { text: text.to_owned(), value, decimals: decimals.len() })
    }

    /// One unit of the last printed digit.
    #[must_use]
    pub fn last_digit(&self) -> f64 {
        (0..self.decimals).fold(1.0, |unit, _| unit / 10.0)
    }
}

/// The measure of a tolerance.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Allowance {
    /// Share of the printed value.
    Relative(f64),
    /// Units of the last printed digit.
    LastDigit(f64),
}

/// A tolerance with its reason.
#[derive(Debug, Clone, PartialEq)]
pub struct Tolerance {
    /// Its name in the data.
    pub id: String,
    /// How much.
    pub allowance: Allowance,
    /// Why so much and no more.
    pub why: String,
}

impl Tolerance {
    /// The greatest difference from a printed value, in the unit of the value.
    #[must_use]
    pub fn allowed(&self, printed: &Printed) -> f64 {
        match self.allowance {
            Allowance::Relative(share) => share * printed.value,
            Allowance::LastDigit(units) => units * printed.last_digit(),
        }
    }
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Entry {
    id: String,
    method: Method,
    readings: Vec<Reading>,
    quantities: Vec<Quantity>,
    relative: Option<f64>,
    last_digit: Option<f64>,
    why: String,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct File {
    remarks: Vec<String>,
    tolerance: Vec<Entry>,
}

/// The tolerances and remarks of a data file.
pub(super) struct Tolerances {
    /// What the comparison says and does not say.
    pub(super) remarks: Vec<String>,
    rules: Vec<(Entry, Tolerance)>,
}

impl Tolerances {
    /// Reads a file.
    pub(super) fn read(text: &str) -> Result<Self, String> {
        let file: File = toml::from_str(text).map_err(|error| error.to_string())?;
        let mut rules: Vec<(Entry, Tolerance)> = Vec::new();
        for entry in file.tolerance {
            let allowance = match (entry.relative, entry.last_digit) {
                (Some(share), None) => Allowance::Relative(share),
                (None, Some(units)) => Allowance::LastDigit(units),
                (None, None) | (Some(_), Some(_)) => {
                    return Err(format!("`{}`: one of `relative` and `last_digit`", entry.id));
                }
            };
            let (Allowance::Relative(size) | Allowance::LastDigit(size)) = allowance;
            if !(size.is_finite() && size > 0.0) || entry.why.trim().is_empty() {
                return Err(format!("`{}` needs a positive value and a reason", entry.id));
            }
            if rules.iter().any(|(_, known)| known.id == entry.id) {
                return Err(format!("two tolerances are called `{}`", entry.id));
            }
            let tolerance = Tolerance { id: entry.id.clone(), allowance, why: entry.why.trim().to_owned() };
            rules.push((entry, tolerance));
        }
        Ok(Self { remarks: file.remarks, rules })
    }

    /// The one tolerance of a row.
    pub(super) fn of(
        &self,
        method: Method,
        reading: Reading,
        quantity: Quantity,
    ) -> Result<&Tolerance, String> {
        let mut fitting = self.rules.iter().filter(|(entry, _)| {
            entry.method == method
                && entry.readings.contains(&reading)
                && entry.quantities.contains(&quantity)
        });
        match (fitting.next(), fitting.next()) {
            (Some((_, only)), None) => Ok(only),
            (None, _) => Err("no tolerance is given for this method, reading and quantity".to_owned()),
            (Some((_, one)), Some((_, other))) => {
                Err(format!("two tolerances are given for it: `{}` and `{}`", one.id, other.id))
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::input::catalog::CASE_TOLERANCES;

    #[test]
    fn digits_say_how_far_a_number_is_rounded() {
        let printed = Printed::read("0.926").unwrap();
        assert!((printed.last_digit() - 0.001).abs() < 1e-18 && printed.decimals == 3);
        assert!((Printed::read("333").unwrap().last_digit() - 1.0).abs() < 1e-15);
        for refused in ["", ".", "1e3", "-1.5", "+1", "NaN", "inf", "1.2.3", "0.00", "1,5", " 1"] {
            assert!(Printed::read(refused).is_none(), "{refused}");
        }
    }

    #[test]
    fn a_tolerance_is_a_share_or_units_of_the_last_digit() {
        let printed = Printed::read("12.7").unwrap();
        let of = |allowance| Tolerance { id: "t".into(), allowance, why: "w".into() }.allowed(&printed);
        assert!((of(Allowance::Relative(0.01)) - 0.127).abs() < 1e-12);
        assert!((of(Allowance::LastDigit(0.5)) - 0.05).abs() < 1e-12);
    }

    #[test]
    fn a_tolerance_without_value_or_reason_is_refused() {
        assert!(Tolerances::read(CASE_TOLERANCES).is_ok());
        for (given, spoilt) in [
            ("relative = 0.006", "# relative = 0.006"),
            ("relative = 0.006", "relative = -0.006"),
            ("relative = 0.006", "relative = 0.006\nlast_digit = 1"),
            ("id = \"table\"", "id = \"concentric\""),
            ("why = \"closed forms", "why = \"\" # "),
        ] {
            assert!(CASE_TOLERANCES.contains(given), "{given}");
            assert!(Tolerances::read(&CASE_TOLERANCES.replacen(given, spoilt, 1)).is_err(), "{spoilt}");
        }
    }

    #[test]
    fn a_row_has_exactly_one_tolerance() {
        let table = Tolerances::read(CASE_TOLERANCES).unwrap();
        let ask = |tolerances: &Tolerances| {
            tolerances
                .of(Method::InstantaneousCentre, Reading::Printed, Quantity::Coefficient)
                .map(|found| found.id.clone())
        };
        assert_eq!(ask(&table), Ok("table".to_owned()));
        let doubled = CASE_TOLERANCES.replace("[\"interpolated\"]", "[\"interpolated\", \"printed\"]");
        assert!(ask(&Tolerances::read(&doubled).unwrap()).unwrap_err().contains("two tolerances"));
        let none = CASE_TOLERANCES.replace("[\"printed\", \"scanned\"]", "[\"scanned\"]");
        assert!(ask(&Tolerances::read(&none).unwrap()).unwrap_err().contains("no tolerance"));
    }
}
