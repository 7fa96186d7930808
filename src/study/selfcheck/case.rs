//! Reads the published cases: one row, one printed value with everything needed to compute it again.
//!
//! The columns are told in `data/cases/README.md`. Every fault of the table is found in one pass, each with its
//! line; a row that states another unit than that of its quantity, lacks what its quantity needs, or does not
//! cite is a fault, because a self-check must not judge a number it has misunderstood.

use super::quantity::{Method, Quantity, Reading};
use super::shape::Shape;
use super::tolerance::Printed;
use crate::diagnostic::{Diagnostic, Place, Severity};
use crate::units::{Dimension, UnitSystem};
use serde::Deserialize;

/// The name of the table in messages.
const FILE: &str = "plane-groups-published.csv";
/// Length l where the source states none, in: any value serves, C does not depend on it.
const ANY_LENGTH: f64 = 10.0;
/// Leg where the source states none, in: any value serves, C and line properties do not depend on it.
const ANY_LEG: f64 = 0.375;
/// Load where the source states none, kip or kN: any value serves, strengths do not depend on it.
const ANY_LOAD: f64 = 1.0;

/// A row of the table as it is written.
#[derive(Debug, Deserialize)]
struct Row {
    id: String,
    method: Method,
    shape: Shape,
    k: f64,
    a: f64,
    length: Option<f64>,
    length_unit: String,
    load_angle_deg: f64,
    leg: Option<f64>,
    load: Option<f64>,
    stress: Option<f64>,
    quantity: Quantity,
    unit: String,
    published: String,
    reading: Reading,
    source: String,
    #[serde(rename = "where")]
    place: String,
    note: String,
}

/// A published value and the weld group it belongs to.
#[derive(Debug, Clone, PartialEq)]
pub struct PublishedCase {
    /// Unique name.
    pub id: String,
    /// The method it comes from.
    pub method: Method,
    /// Shape of the weld group.
    pub shape: Shape,
    /// Second dimension over the length.
    pub k: f64,
    /// Distance from the weld centroid to the load over the length.
    pub a: f64,
    /// Length, mm.
    pub length: f64,
    /// Angle of the load from the vertical, degrees.
    pub load_angle_deg: f64,
    /// Leg, mm.
    pub leg: f64,
    /// Load, N.
    pub load: f64,
    /// Permissible stress of the throat, MPa, where the source designs for one.
    pub stress: Option<f64>,
    /// Units of the source.
    pub units: UnitSystem,
    /// What is printed.
    pub quantity: Quantity,
    /// The printed value, in the unit of its quantity.
    pub expected: Printed,
    /// How it was taken from the source.
    pub reading: Reading,
    /// The document.
    pub source: String,
    /// The place in it.
    pub place: String,
    /// Remarks; empty when none.
    pub note: String,
}

/// The cases of a table.
///
/// # Errors
/// All faults of the table.
pub(super) fn read(text: &str) -> Result<Vec<PublishedCase>, Vec<Diagnostic>> {
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let (mut cases, mut faults) = (Vec::<PublishedCase>::new(), Vec::new());
    let titles = match reader.headers() {
        Ok(titles) => titles.clone(),
        Err(error) => return Err(vec![fault(None, error.to_string())]),
    };
    for record in reader.records() {
        let record = match record {
            Ok(record) => record,
            Err(error) => {
                let message = "the row has not as many fields as there are columns".to_owned();
                faults.push(fault(place(error.position()), message));
                continue;
            }
        };
        let row = record.deserialize::<Row>(Some(&titles));
        let message = match row.map_err(|error| field_fault(&error, &titles)).and_then(Row::case) {
            Ok(case) if cases.iter().any(|known| known.id == case.id) => {
                format!("two rows are called `{}`", case.id)
            }
            Ok(case) => {
                cases.push(case);
                continue;
            }
            Err(message) => message,
        };
        faults.push(fault(place(record.position()), message));
    }
    if cases.is_empty() && faults.is_empty() {
        faults.push(fault(None, "there is no published case to compare with".to_owned()));
    }
    if faults.is_empty() { Ok(cases) } else { Err(faults) }
}

/// What is wrong with a field, after its title where the reader knows it.
fn field_fault(error: &csv::Error, titles: &csv::StringRecord) -> String {
    let csv::ErrorKind::Deserialize { err, .. } = error.kind() else { return error.to_string() };
    let title = err.field().and_then(|field| titles.get(usize::try_from(field).ok()?));
    title.map_or_else(|| err.kind().to_string(), |title| format!("`{title}`: {}", err.kind()))
}

fn place(position: Option<&csv::Position>) -> Option<Place> {
    let number = |value: u64| usize::try_from(value).unwrap_or(usize::MAX);
    position.map(|position| {
        let byte = number(position.byte());
        Place { span: byte..byte, line: number(position.line()), column: 1 }
    })
}

/// A fault of the table.
pub(super) fn fault(place: Option<Place>, message: String) -> Diagnostic {
    Diagnostic {
        severity: Severity::Fault,
        file: FILE.to_owned(),
        place,
        message,
        accepted: None,
        hint: None,
    }
}

impl Row {
    /// The case of a row, everything in inside units.
    fn case(self) -> Result<PublishedCase, String> {
        let units = match (self.length_unit.as_str(), self.length) {
            ("in", _) | ("", None) => UnitSystem::Us,
            ("mm", _) => UnitSystem::Metric,
            (unit, _) => return Err(format!("`length_unit` is `{unit}`: in or mm is accepted")),
        };
        if self.unit != self.quantity.unit() {
            let (quantity, unit) = (self.quantity.name(), self.quantity.unit());
            return Err(format!("the unit of `{quantity}` is {unit}, not `{}`", self.unit));
        }
        if !self.quantity.belongs_to(self.method) {
            return Err(format!("`{}` is no result of this method", self.quantity.name()));
        }
        if [&self.id, &self.source, &self.place].iter().any(|text| text.trim().is_empty()) {
            return Err("a row needs an id, a source and a place in it".to_owned());
        }
        for (title, given) in self.needed() {
            if given.is_none() {
                return Err(format!("`{}` cannot be computed without `{title}`", self.quantity.name()));
            }
        }
        let given = [self.length, self.leg, self.load, self.stress];
        let positive = given.iter().flatten().all(|value| value.is_finite() && *value > 0.0);
        let ratios = self.k >= 0.0 && self.k.is_finite() && self.a >= 0.0 && self.a.is_finite();
        if !positive || !ratios || !self.load_angle_deg.is_finite() {
            return Err("dimensions, loads and stresses are positive and finite".to_owned());
        }
        let Some(expected) = Printed::read(&self.published) else {
            return Err(format!("`published` is `{}`: digits are accepted, as printed", self.published));
        };
        // What the source leaves open is in US units.
        let inside = |dimension: Dimension, value: Option<f64>, any: f64| match value {
            Some(value) => units.inside(dimension, value),
            None => UnitSystem::Us.inside(dimension, any),
        };
        Ok(PublishedCase {
            method: self.method,
            shape: self.shape,
            k: self.k,
            a: self.a,
            length: inside(Dimension::Length, self.length, ANY_LENGTH),
            load_angle_deg: self.load_angle_deg,
            leg: inside(Dimension::Length, self.leg, ANY_LEG),
            load: inside(Dimension::Force, self.load, ANY_LOAD),
            stress: self.stress.map(|stress| units.inside(Dimension::Stress, stress)),
            units,
            quantity: self.quantity,
            expected,
            reading: self.reading,
            id: self.id,
            source: self.source,
            place: self.place,
            note: self.note,
        })
    }

    /// The columns without which a quantity has no value.
    fn needed(&self) -> Vec<(&'static str, Option<f64>)> {
        match self.quantity {
            Quantity::Coefficient | Quantity::DesignCoefficient => Vec::new(),
            Quantity::InertiaX | Quantity::InertiaY | Quantity::InertiaPolar | Quantity::LineForce => {
                vec![("length", self.length)]
            }
            Quantity::LoadLrfd | Quantity::LoadAsd => vec![("length", self.length), ("leg", self.leg)],
            Quantity::Throat => {
                vec![("length", self.length), ("load", self.load), ("stress", self.stress)]
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::input::catalog::PUBLISHED_CASES;

    /// The table with one text replaced by another.
    fn spoilt(given: &str, replacement: &str) -> Vec<Diagnostic> {
        assert!(PUBLISHED_CASES.contains(given), "{given}");
        read(&PUBLISHED_CASES.replacen(given, replacement, 1)).unwrap_err()
    }

    #[test]
    fn every_row_is_read() {
        assert_eq!(read(PUBLISHED_CASES).unwrap().len(), PUBLISHED_CASES.lines().count() - 1);
    }

    #[test]
    fn lengths_loads_and_stresses_are_in_the_units_of_the_source() {
        let cases = read(PUBLISHED_CASES).unwrap();
        let case = |id: &str| cases.iter().find(|case| case.id == id).unwrap();
        let (us, metric) = (case("DE16-II.A-27-Pu"), case("BH-8.9"));
        assert!((us.length - 254.0).abs() < 1e-12 && (us.leg - 9.525).abs() < 1e-12);
        assert!((metric.length - 50.0).abs() < 1e-12 && (metric.load - 7500.0).abs() < 1e-9);
        assert_eq!(metric.stress, Some(100.0));
    }

    #[test]
    fn a_row_that_is_misunderstood_is_a_fault_with_its_line() {
        for (given, replacement, message) in [
            ("in^4/in,333", "mm^4/mm,333", "the unit of `i_x` is in^4/in, not `mm^4/mm`"),
            ("elastic,c,0.5,0.875", "concentric,c,0.5,0.875", "`i_x` is no result of this method"),
            ("0,0.375,,,load-lrfd", "0,,,,load-lrfd", "`load-lrfd` cannot be computed without `leg`"),
            ("7.5,100,throat", "-7.5,100,throat", "positive and finite"),
            (",333,", ",about 333,", "`published` is `about 333`"),
            ("50,mm,", "50,ft,", "`length_unit` is `ft`"),
            ("BH-8.10,", "BH-8.9,", "two rows are called `BH-8.9`"),
            ("V. B. Bhandari, Design of Machine Elements", " ", "a source"),
            ("elastic,two-lines-across", "elastic,circle", "unknown variant `circle`"),
            (",1,2.5,50,mm", ",one,2.5,50,mm", "`k`: "),
            (",2.5,50,", ",2.5;50,", "fields"),
        ] {
            let faults = spoilt(given, replacement);
            assert_eq!(faults.len(), 1, "{replacement}: {faults:?}");
            assert!(faults[0].message.contains(message), "{}", faults[0]);
            assert!(faults[0].place.as_ref().unwrap().line > 100, "{}", faults[0]);
        }
    }

    #[test]
    fn all_faults_are_found_in_one_pass_and_an_empty_table_is_one() {
        assert_eq!(
            read(&PUBLISHED_CASES.replace("V. B. Bhandari", "").replace(",mm,", ",ft,")).unwrap_err().len(),
            2
        );
        let titles = PUBLISHED_CASES.lines().next().unwrap();
        assert!(read(titles).unwrap_err()[0].message.contains("no published case"));
        assert!(read("").is_err() && read("a,b\n1,2\n").is_err());
    }
}
