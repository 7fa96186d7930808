//! What variables, their values and points are called in text.

use crate::output::number::graded;
use crate::study::sweep::{Sweep, Variable};

/// How much finer than a step a value between two points is shown.
const FINER: f64 = 0.1;

/// The values of all variables as text, in the file's units.
pub(in crate::output) struct Labels<'s> {
    sweep: &'s Sweep,
    values: Vec<Vec<String>>,
}

impl<'s> Labels<'s> {
    pub(in crate::output) fn new(sweep: &'s Sweep) -> Self {
        let texts = |variable: &Variable| {
            let shown: Vec<f64> = variable.values.iter().map(|value| variable.shown(*value)).collect();
            graded(&shown, step(variable))
        };
        Self { sweep, values: sweep.variables.iter().map(texts).collect() }
    }

    /// All values of a variable, without unit.
    pub(in crate::output) fn values(&self, variable: usize) -> &[String] {
        self.values.get(variable).map_or(&[], Vec::as_slice)
    }

    /// A value of a variable with its unit.
    pub(in crate::output) fn value(&self, variable: usize, index: usize) -> String {
        let value = self.values(variable).get(index).map_or("", String::as_str);
        with_unit(value, &self.sweep.variables[variable])
    }

    /// A value between two points with its unit.
    pub(in crate::output) fn between(&self, variable: usize, value: f64) -> String {
        let variable = &self.sweep.variables[variable];
        let shown = graded(&[variable.shown(value)], FINER * step(variable));
        with_unit(&shown.concat(), variable)
    }

    /// Where a point is: `arm = 150 mm, load.angle = 45 deg`.
    pub(in crate::output) fn point(&self, point: usize) -> String {
        let indices = self.sweep.indices(point);
        let parts = self.sweep.variables.iter().zip(indices).enumerate();
        let parts: Vec<String> = parts
            .map(|(at, (variable, index))| format!("{} = {}", variable.name, self.value(at, index)))
            .collect();
        parts.join(", ")
    }

    /// What a variable runs through: `arm from 150 mm to 600 mm, 10 values; 290 mm as given`.
    pub(in crate::output) fn range(&self, variable: usize) -> String {
        let last = self.values(variable).len().saturating_sub(1);
        let Variable { name, given, .. } = &self.sweep.variables[variable];
        let given =
            given.map_or_else(String::new, |own| format!("; {} as given", self.between(variable, own)));
        let (from, to) = (self.value(variable, 0), self.value(variable, last));
        format!("{name} from {from} to {to}, {} values{given}", last + 1)
    }
}

/// The distance of two values, in the file's unit.
fn step(variable: &Variable) -> f64 {
    match variable.values.as_slice() {
        [first, second, ..] => variable.shown(second - first),
        _ => 0.0,
    }
}

fn with_unit(value: &str, variable: &Variable) -> String {
    format!("{value} {}", variable.unit).trim_end().to_owned()
}
