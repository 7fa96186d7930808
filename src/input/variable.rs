//! What is varied over which values: `NAME=FROM:TO:COUNT`, a parameter of the file or a property of its load.
//!
//! The ends follow the rules of `--set`: a quantity with its unit, an expression of parameters (as the file
//! stands) or, for a parameter that is one, a pure number. They must have the dimension of the parameter's own
//! value. The two names of the load hold a dot, which no parameter can; for them a bare number is in the file's
//! units, as in a field of the file.
//!
//! `v_i = (from (n - 1 - i) + to i) / (n - 1)`, i = 0 .. n - 1; what rounding leaves of a zero is zero.

use super::check::LARGEST_ANGLE;
use super::dimension::Exponents;
use super::faults::{Faults, Origin, shortened};
use super::field::Expression;
use super::parameters::report_unknown;
use super::quantity::{Quantity, shown};
use super::template::{Template, finished};
use crate::diagnostic::Diagnostic;
use crate::model::LARGEST_LENGTH;
use crate::units::Dimension;

/// Most values of one variable.
const MOST_VALUES: usize = 10_000;
/// Most points of all variables together.
pub const MOST_POINTS: usize = 250_000;
/// Most variables of one sweep: what a table or a drawing can show.
const MOST_VARIABLES: usize = 2;
/// Share of the larger end below which a value is a rounded zero.
const ROUNDED_ZERO: f64 = 1e-12;

/// Names of the properties of the load.
const LOAD_NAMES: [(&str, Target, Dimension); 2] = [
    ("load.eccentricity", Target::LoadEccentricity, Dimension::Length),
    ("load.angle", Target::LoadAngle, Dimension::Angle),
];

/// What a variable changes.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Target {
    /// A parameter of the file.
    Parameter,
    /// Distance of the resultant's line of action from the weld centroid, mm.
    LoadEccentricity,
    /// Angle of the resultant force from the x axis, rad.
    LoadAngle,
}

/// One variable with its values.
#[derive(Debug, Clone, PartialEq)]
pub struct Variable {
    /// Name as given.
    pub name: String,
    /// What it changes.
    pub target: Target,
    /// Symbol of the unit in which people see its values: the file's; empty for a pure number.
    pub unit: String,
    /// How many inside units `unit` holds.
    pub factor: f64,
    /// Symbol of the inside unit.
    pub inside_unit: String,
    /// The parameter's value in the file, inside units; `None` for a property of the load, which each case has
    /// its own of.
    pub given: Option<f64>,
    /// Its values in the inside units (N, mm, rad and their products), at least two.
    pub values: Vec<f64>,
}

impl Variable {
    /// A value (inside units) in the file's unit.
    #[must_use]
    pub fn shown(&self, value: f64) -> f64 {
        value / self.factor
    }

    /// The first value.
    #[must_use]
    pub fn from(&self) -> f64 {
        self.values.first().copied().unwrap_or_default()
    }

    /// The last value.
    #[must_use]
    pub fn to(&self) -> f64 {
        self.values.last().copied().unwrap_or_default()
    }

    /// Whether it changes the load and leaves the welds as they are.
    #[must_use]
    pub fn is_of_load(&self) -> bool {
        match self.target {
            Target::Parameter => false,
            Target::LoadEccentricity | Target::LoadAngle => true,
        }
    }
}

impl Template {
    /// Reads the variables of a sweep, each `NAME=FROM:TO:COUNT`.
    ///
    /// # Errors
    /// Every fault of the texts: form, unknown name, dimension, range, count, too many points.
    pub fn variables(&self, texts: &[String]) -> Result<Vec<Variable>, Vec<Diagnostic>> {
        let mut faults = self.faults();
        if texts.is_empty() || texts.len() > MOST_VARIABLES {
            let bare = Origin::Option { name: "--vary", text: String::new() };
            faults.at(bare, format!("{} variables are given", texts.len())).accepted("one or two");
        }
        let mut variables: Vec<Variable> = Vec::new();
        for text in texts {
            let origin = Origin::Option { name: "--vary", text: text.clone() };
            let Some(variable) = self.variable(text, &origin, &mut faults) else { continue };
            if variables.iter().any(|known| known.name == variable.name) {
                faults.at(&origin, format!("`{}` is varied twice", variable.name)).hint("keep one of them");
            }
            variables.push(variable);
        }
        let points: usize = variables.iter().map(|variable| variable.values.len()).product();
        if points > MOST_POINTS {
            let bare = Origin::Option { name: "--vary", text: String::new() };
            faults
                .at(bare, format!("the variables make {points} points"))
                .accepted(format!("at most {MOST_POINTS}"));
        }
        finished(Some(variables), faults)
    }

    fn variable(&self, text: &str, origin: &Origin, faults: &mut Faults<'_>) -> Option<Variable> {
        let Some((name, from, to, count)) = parts(text) else {
            faults
                .at(origin, "this is no range of values")
                .accepted("`NAME=FROM:TO:COUNT`, for example `b=100mm:200mm:11`");
            return None;
        };
        let load = LOAD_NAMES.iter().find(|(known, ..)| *known == name);
        let (target, exponents) = match (load, self.parameter(name)) {
            (Some((_, target, dimension)), _) => (*target, Exponents::of(*dimension)),
            (None, Some(own)) => (Target::Parameter, own.exponents),
            (None, None) => {
                let names = LOAD_NAMES.iter().map(|(name, ..)| *name);
                let known: Vec<&str> = self.parameters().names().into_iter().chain(names).collect();
                report_unknown(name, &known, origin, faults);
                return None;
            }
        };
        let (unit, factor) = exponents.unit(self.as_given().units);
        let asked = Asked { name, target, exponents, unit: &unit, factor };
        let (from, to) = (self.end(&asked, from, origin, faults), self.end(&asked, to, origin, faults));
        let count = self::count(count, origin, faults)?;
        let values = values(from?, to?, count, factor);
        if values.windows(2).any(|pair| (pair[1] - pair[0]).abs() <= 0.0) {
            faults.at(origin, "the values do not differ").accepted("two ends that differ");
            return None;
        }
        let given = match target {
            Target::Parameter => self.parameter(name).map(|own| own.value),
            Target::LoadEccentricity | Target::LoadAngle => None,
        };
        let (name, inside_unit) = (name.to_owned(), exponents.inside_unit());
        Some(Variable { name, target, unit, factor, inside_unit, given, values })
    }

    /// One end of a range, in the inside units.
    fn end(&self, asked: &Asked<'_>, text: &str, origin: &Origin, faults: &mut Faults<'_>) -> Option<f64> {
        let bare = text.parse::<f64>().ok().filter(|number| number.is_finite());
        let value = match (asked.target, bare) {
            (Target::LoadEccentricity | Target::LoadAngle, Some(bare)) => bare * asked.factor,
            (Target::LoadEccentricity | Target::LoadAngle | Target::Parameter, _) => {
                let expression = Expression::read(text, origin.clone(), None, faults)?;
                let found = self.parameters().value(&expression, faults)?;
                if found.exponents != asked.exponents {
                    asked.wrong_dimension(text, found, origin, faults);
                    return None;
                }
                found.value
            }
        };
        let (dimension, largest) = match asked.target {
            Target::Parameter => return Some(value),
            Target::LoadEccentricity => (Dimension::Length, LARGEST_LENGTH),
            Target::LoadAngle => (Dimension::Angle, LARGEST_ANGLE.to_radians()),
        };
        if value.abs() <= largest * (1.0 + ROUNDED_ZERO) {
            return Some(value);
        }
        let shown = |value: f64| shown(self.as_given().units, dimension, value);
        faults.at(origin, format!("`{text}` is too large")).accepted(format!(
            "{} to {}",
            shown(-largest),
            shown(largest)
        ));
        None
    }
}

/// A variable whose ends are still to be read.
struct Asked<'a> {
    name: &'a str,
    target: Target,
    exponents: Exponents,
    unit: &'a str,
    factor: f64,
}

impl Asked<'_> {
    fn wrong_dimension(&self, text: &str, found: Quantity, origin: &Origin, faults: &mut Faults<'_>) {
        let (wanted, found_name) = (self.exponents.name(), found.exponents.name());
        let message = format!("`{}` is {wanted}, but `{}` is {found_name}", self.name, shortened(text));
        let reported = faults.at(origin, message).accepted(wanted);
        if found.exponents == Exponents::PURE && text.parse::<f64>().is_ok() {
            reported.hint(format!("give {text} a unit: {text} {}", self.unit));
        }
    }
}

/// Name, ends and count of `NAME=FROM:TO:COUNT`.
fn parts(text: &str) -> Option<(&str, &str, &str, &str)> {
    let (name, range) = text.split_once('=')?;
    let mut parts = range.split(':').map(str::trim);
    let (from, to, count) = (parts.next()?, parts.next()?, parts.next()?);
    let whole = parts.next().is_none() && ![name.trim(), from, to, count].contains(&"");
    whole.then_some((name.trim(), from, to, count))
}

fn count(text: &str, origin: &Origin, faults: &mut Faults<'_>) -> Option<usize> {
    let read = text.parse::<usize>().ok().filter(|count| (2..=MOST_VALUES).contains(count));
    if read.is_none() {
        faults
            .at(origin, format!("a number of values is wanted, found `{}`", shortened(text)))
            .accepted(format!("a whole number from 2 to {MOST_VALUES}"));
    }
    read
}

/// Values at equal distances in units of `factor`, so that round numbers stay round; both ends exact.
fn values(from: f64, to: f64, count: usize, factor: f64) -> Vec<f64> {
    let last = count - 1;
    let zero = ROUNDED_ZERO * from.abs().max(to.abs());
    let (first, end) = (round_number(from / factor), round_number(to / factor));
    let value = |index: usize| {
        #[allow(clippy::cast_precision_loss)] // at most 10 000
        let (before, behind, all) = (index as f64, (last - index) as f64, last as f64);
        let value = (first * behind + end * before) / all * factor;
        if value.abs() <= zero { 0.0 } else { value }
    };
    let mut values: Vec<f64> = (1..last).map(value).collect();
    values.insert(0, from);
    values.push(to);
    values
}

/// What a number of at most six decimals was before rounding touched its last place.
fn round_number(value: f64) -> f64 {
    let round = (value * 1e6).round() / 1e6;
    if (round - value).abs() <= 4.0 * f64::EPSILON * value.abs() { round } else { value }
}

#[cfg(test)]
#[allow(clippy::float_cmp)] // exact values are meant exactly
mod tests {
    use super::*;
    use crate::input::Options;
    use crate::input::catalog::DEMO;
    use std::f64::consts::FRAC_PI_2;

    fn variables(texts: &[&str]) -> Result<Vec<Variable>, Vec<String>> {
        let template = Template::read("demo.toml", DEMO, &Options::default()).unwrap();
        let texts: Vec<String> = texts.iter().map(|text| (*text).to_owned()).collect();
        let text = |faults: Vec<Diagnostic>| faults.iter().map(ToString::to_string).collect();
        template.variables(&texts).map_err(text)
    }

    fn only_fault(text: &str) -> String {
        let mut faults = variables(&[text]).unwrap_err();
        assert_eq!(faults.len(), 1, "{faults:?}");
        faults.remove(0)
    }

    #[test]
    fn ends_are_quantities_or_expressions_of_parameters() {
        let found = variables(&["arm = 5cm : depth + 60 mm : 6"]).unwrap();
        assert_eq!(found[0].values, [50.0, 100.0, 150.0, 200.0, 250.0, 300.0]);
        assert_eq!((found[0].unit.as_str(), found[0].target), ("mm", Target::Parameter));
        assert_eq!(found[0].given, Some(290.0));
    }

    #[test]
    fn bare_numbers_of_the_load_are_in_the_units_of_the_file() {
        let found = variables(&["load.angle=-90:90:3", "load.eccentricity=600:0:4"]).unwrap();
        assert_eq!(found[0].values, [-FRAC_PI_2, 0.0, FRAC_PI_2]);
        assert_eq!(found[0].shown(found[0].to()), 90.0);
        assert_eq!(found[1].values, [600.0, 400.0, 200.0, 0.0]);
        assert!(found.iter().all(Variable::is_of_load));
        let found = &variables(&["load.angle=-30 deg:60 deg:91"]).unwrap()[0];
        assert_eq!((found.values[30], found.values[107 - 30]), (0.0, 47.0 * found.factor));
    }

    #[test]
    fn a_wrong_dimension_is_a_fault_with_the_unit_that_is_missing() {
        assert_eq!(
            only_fault("arm=100:600 mm:3"),
            "--vary: in `arm=100:600 mm:3`: `arm` is a length, but `100` is a pure number; accepted: a length; \
             hint: give 100 a unit: 100 mm"
        );
        assert_eq!(variables(&["arm=100:600:3"]).unwrap_err().len(), 2);
        assert!(
            only_fault("load.angle=0:3 mm:3").contains("`load.angle` is an angle, but `3 mm` is a length")
        );
    }

    #[test]
    fn an_unknown_name_lists_the_parameters_and_the_load() {
        let fault = only_fault("load.angel=0:90:3");
        assert!(fault.contains("`arm`, `depth`, `reach`, `load.eccentricity`, `load.angle`"), "{fault}");
        assert!(fault.ends_with("did you mean `load.angle`?"), "{fault}");
        assert!(only_fault("amr=1 mm:2 mm:3").ends_with("did you mean `arm`?"));
    }

    #[test]
    fn form_count_and_range_are_checked() {
        for text in ["arm", "arm=1 mm:2 mm", "arm=1 mm:2 mm:3:4", "=1 mm:2 mm:3", "arm=:2 mm:3"] {
            assert!(only_fault(text).contains("`NAME=FROM:TO:COUNT`"), "{text}");
        }
        for count in ["1", "0", "-3", "2.5", "10001", "many"] {
            assert!(only_fault(&format!("arm=1 mm:2 mm:{count}")).contains("2 to 10000"), "{count}");
        }
        assert!(only_fault("arm=2 mm:0.2 cm:3").contains("do not differ"));
        assert!(only_fault("load.eccentricity=0:1e9:3").contains("too large"));
        assert!(only_fault("load.angle=0:inf:3").contains("inf"));
    }

    #[test]
    fn the_number_of_variables_and_points_is_limited() {
        let faults = variables(&["arm=1 mm:2 mm:600", "load.angle=0:90:600"]).unwrap_err();
        assert_eq!(faults, ["--vary: the variables make 360000 points; accepted: at most 250000"]);
        assert!(variables(&["arm=1 mm:2 mm:3", "arm=1 mm:2 mm:4"]).unwrap_err()[0].contains("varied twice"));
        assert!(variables(&[]).unwrap_err()[0].contains("one or two"));
        assert!(variables(&["arm=1 mm:2 mm:3"; 3]).unwrap_err()[0].contains("3 variables"));
    }
}
