//! The element table: where each piece of weld is and what it carries by both methods.
//!
//! Forces and moments (about the weld centroid) of both methods are at the given load, so each of their
//! columns sums to the given load; deformations are those at first rupture. Units are those of the joint file
//! and stand in the column titles. In a run over files of both unit systems one table needs one system: that
//! of the first joint.

use super::{field, joint_labels, to_text, unit_suffix};
use crate::analysis::{CellForce, ElementRow, Report};
use crate::model::Joint;
use crate::output::number::machine;
use crate::units::{Dimension, UnitSystem};

/// Number of columns.
const COLUMNS: usize = 28;

/// The element table of all joints and cases; its titles alone when there is none.
#[must_use]
pub fn elements_csv(reports: &[Report]) -> String {
    let units = reports.first().map_or(UnitSystem::Metric, |report| report.joint.units);
    let mut rows = vec![titles(units)];
    for (report, label) in reports.iter().zip(joint_labels(reports)) {
        for case in &report.cases {
            rows.extend(
                case.elements.iter().map(|row| fields(row, &report.joint, [&label, &case.name], units)),
            );
        }
    }
    to_text(rows)
}

fn titles(units: UnitSystem) -> [String; COLUMNS] {
    let with = |name: &str, dimension: Dimension| format!("{name}_{}", unit_suffix(units, dimension));
    let plain = str::to_owned;
    let [force, moment, line] = [Dimension::Force, Dimension::Moment, Dimension::LineForce];
    [
        plain("joint"),
        plain("case"),
        plain("weld"),
        plain("element"),
        with("x", Dimension::Length),
        with("y", Dimension::Length),
        with("z", Dimension::Length),
        with("length", Dimension::Length),
        with("leg", Dimension::Length),
        with("throat", Dimension::Length),
        plain("angle_deg"),
        with("deformation", Dimension::Length),
        plain("deformation_ratio"),
        with("fx", force),
        with("fy", force),
        with("fz", force),
        with("mx", moment),
        with("my", moment),
        with("mz", moment),
        with("force_per_length", line),
        with("elastic_fx", force),
        with("elastic_fy", force),
        with("elastic_fz", force),
        with("elastic_mx", moment),
        with("elastic_my", moment),
        with("elastic_mz", moment),
        with("elastic_force_per_length", line),
        plain("elastic_ratio"),
    ]
}

fn fields(row: &ElementRow, joint: &Joint, labels: [&str; 2], units: UnitSystem) -> [String; COLUMNS] {
    let weld = joint.group.welds().get(row.weld);
    let length = |value: f64| machine(units.shown(Dimension::Length, value));
    let optional_length = |value: Option<f64>| value.map(length).unwrap_or_default();
    let [fx, fy, fz, mx, my, mz, line] = cell(row.ultimate.as_ref(), units);
    let [elastic_fx, elastic_fy, elastic_fz, elastic_mx, elastic_my, elastic_mz, elastic_line] =
        cell(Some(&row.elastic), units);
    [
        labels[0].to_owned(),
        labels[1].to_owned(),
        weld.map(|weld| weld.name.clone()).unwrap_or_default(),
        row.element.to_string(),
        length(row.at.x),
        length(row.at.y),
        length(row.at.z),
        length(row.length),
        optional_length(weld.and_then(|weld| weld.size.leg())),
        optional_length(weld.map(|weld| weld.total_throat())),
        field(row.angle.map(f64::to_degrees)),
        optional_length(row.deformation),
        field(row.deformation_ratio),
        fx,
        fy,
        fz,
        mx,
        my,
        mz,
        line,
        elastic_fx,
        elastic_fy,
        elastic_fz,
        elastic_mx,
        elastic_my,
        elastic_mz,
        elastic_line,
        machine(row.elastic_ratio),
    ]
}

/// Force, moment and force per length of one method; empty where it has no answer.
fn cell(cell: Option<&CellForce>, units: UnitSystem) -> [String; 7] {
    let Some(CellForce { force, moment, force_per_length }) = cell else {
        return std::array::from_fn(|_| String::new());
    };
    let shown = |dimension: Dimension, value: f64| machine(units.shown(dimension, value));
    [
        shown(Dimension::Force, force.x),
        shown(Dimension::Force, force.y),
        shown(Dimension::Force, force.z),
        shown(Dimension::Moment, moment.x),
        shown(Dimension::Moment, moment.y),
        shown(Dimension::Moment, moment.z),
        shown(Dimension::LineForce, *force_per_length),
    ]
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::output::fixture;

    fn table(report: Report) -> Vec<::csv::StringRecord> {
        let text = elements_csv(&[report]);
        let mut reader = ::csv::ReaderBuilder::new().has_headers(false).from_reader(text.as_bytes());
        reader.records().map(Result::unwrap).collect()
    }

    fn column(table: &[::csv::StringRecord], title: &str) -> Vec<String> {
        let index = table[0].iter().position(|name| name == title).unwrap();
        table[1..].iter().map(|record| record[index].to_owned()).collect()
    }

    fn sum(table: &[::csv::StringRecord], title: &str) -> f64 {
        column(table, title).iter().map(|text| text.parse::<f64>().unwrap()).sum()
    }

    #[test]
    fn titles_carry_the_units_of_the_file() {
        let report = fixture::report(vec![fixture::case("crane", 2.0)], Some(0));
        let mut american = report.clone();
        american.joint.units = UnitSystem::Us;
        let titles =
            |report: &Report| elements_csv(std::slice::from_ref(report)).lines().next().unwrap().to_owned();
        insta::assert_snapshot!(format!("{}\n{}", titles(&report), titles(&american)));
    }

    #[test]
    fn columns_sum_to_the_given_load() {
        let table = table(fixture::report(vec![fixture::case("crane", 2.0)], Some(0)));
        for (title, expected) in
            [("fy_kN", -60.0), ("elastic_fy_kN", -60.0), ("mz_kN_m", -9.6), ("elastic_mz_kN_m", -9.6)]
        {
            assert!((sum(&table, title) - expected).abs() < 1e-9, "{title}");
        }
    }

    #[test]
    fn legs_and_throats_are_those_of_the_weld() {
        let table = table(fixture::report(vec![fixture::case("crane", 2.0)], Some(0)));
        assert_eq!(column(&table, "leg_mm"), ["8", "6"]);
        assert_eq!(column(&table, "throat_mm"), ["5.65685424949", "4.24264068712"]);
    }

    #[test]
    fn a_method_without_an_answer_leaves_its_fields_empty() {
        let table = table(fixture::report(vec![fixture::unsolved("crane")], None));
        for title in ["fx_kN", "mz_kN_m", "angle_deg", "deformation_mm", "deformation_ratio"] {
            assert_eq!(column(&table, title), ["", ""], "{title}");
        }
        assert!((sum(&table, "elastic_fy_kN") + 60.0).abs() < 1e-9);
    }

    #[test]
    fn joints_of_one_title_are_told_apart_by_file_and_commas_are_quoted() {
        let mut twin = fixture::report(vec![fixture::case("crane", 2.0)], Some(0));
        let first = twin.clone();
        twin.joint.file = "other.toml".into();
        let text = elements_csv(&[first, twin]);
        assert!(text.contains("\"Davit bracket, pier 4 (other.toml)\",crane,back,1,"), "{text}");
        assert!(text.ends_with("\r\n"));
    }

    #[test]
    fn without_reports_the_titles_stand_alone() {
        assert_eq!(elements_csv(&[]).lines().count(), 1);
    }
}
