//! Machine outputs of real runs against the contract.

use super::{BRACKET, Desk};
use serde_json::Value;

/// Keys of the contract that every document has, as paths; `*` stands for every entry of a list.
const CONTRACT: &[&str] = &[
    "schema",
    "version",
    "joints.*.file",
    "joints.*.title",
    "joints.*.rules",
    "joints.*.law",
    "joints.*.length",
    "joints.*.throat_area",
    "joints.*.centroid",
    "joints.*.governing",
    "joints.*.findings",
    "joints.*.cases.*.case",
    "joints.*.cases.*.status",
    "joints.*.cases.*.load.force",
    "joints.*.cases.*.load.moment_about_centroid",
    "joints.*.cases.*.verification.basis",
    "joints.*.cases.*.verification.check",
    "joints.*.cases.*.verification.utilisation",
    "joints.*.cases.*.ultimate.load_factor",
    "joints.*.cases.*.ultimate.design_load_factor",
    "joints.*.cases.*.ultimate.utilisation",
    "joints.*.cases.*.ultimate.accepted",
    "joints.*.cases.*.ultimate.centre",
    "joints.*.cases.*.ultimate.translation",
    "joints.*.cases.*.ultimate.rotation",
    "joints.*.cases.*.ultimate.critical.weld",
    "joints.*.cases.*.ultimate.critical.at",
    "joints.*.cases.*.ultimate.critical.angle_deg",
    "joints.*.cases.*.ultimate.critical.deformation",
    "joints.*.cases.*.ultimate.critical.deformation_limit",
    "joints.*.cases.*.ultimate.states.*.load_factor",
    "joints.*.cases.*.ultimate.states.*.centre",
    "joints.*.cases.*.ultimate.peak_load_factor",
    "joints.*.cases.*.ultimate.residual",
    "joints.*.cases.*.ultimate.error_estimate",
    "joints.*.cases.*.elastic.load_factor",
    "joints.*.cases.*.elastic.design_load_factor",
    "joints.*.cases.*.elastic.utilisation",
    "joints.*.cases.*.elastic.critical.weld",
    "joints.*.cases.*.elastic.critical.at",
    "joints.*.cases.*.elastic.critical.force_per_length",
    "joints.*.cases.*.ultimate_over_elastic",
    "joints.*.cases.*.checks.*.id",
    "joints.*.cases.*.checks.*.clause",
    "joints.*.cases.*.checks.*.subject",
    "joints.*.cases.*.checks.*.demand",
    "joints.*.cases.*.checks.*.resistance",
    "joints.*.cases.*.checks.*.unit",
    "joints.*.cases.*.checks.*.utilisation",
    "joints.*.cases.*.checks.*.verdict",
    "joints.*.cases.*.checks.*.values",
];

fn has_path(value: &Value, path: &[&str]) -> bool {
    match path {
        [] => true,
        ["*", rest @ ..] => {
            value.as_array().is_some_and(|entries| entries.iter().all(|entry| has_path(entry, rest)))
        }
        [key, rest @ ..] => value.get(key).is_some_and(|next| has_path(next, rest)),
    }
}

fn components(value: &Value) -> Vec<f64> {
    value.as_array().unwrap().iter().map(|number| number.as_f64().unwrap()).collect()
}

#[test]
fn the_json_has_every_key_of_the_contract() {
    let desk = Desk::new("json-keys");
    desk.put("a.toml", BRACKET);
    let json = desk.run(&["check", "a.toml", "--format", "json"]).ends_with(0).json();
    assert_eq!(json["schema"], "weldpole.check/1");
    for path in CONTRACT {
        assert!(has_path(&json, &path.split('.').collect::<Vec<_>>()), "{path} in {json:#}");
    }
}

#[test]
fn the_json_is_in_newtons_and_millimetres_and_consistent() {
    let desk = Desk::new("json-numbers");
    desk.put("a.toml", BRACKET);
    let json = desk.run(&["check", "a.toml", "--format", "json"]).ends_with(0).json();
    let joint = &json["joints"][0];
    assert_eq!(joint["length"], 400.0);
    assert_eq!(joint["governing"], "crane");
    let case = &joint["cases"][0];
    assert_eq!(components(&case["load"]["force"]), [0.0, -60_000.0, 0.0]);
    assert_eq!(components(&case["load"]["moment_about_centroid"]), [0.0, 0.0, -12e6]);
    let number = |value: &Value| value.as_f64().unwrap();
    let (ultimate, elastic) = (&case["ultimate"], &case["elastic"]);
    let close = |a: f64, b: f64| (a / b - 1.0).abs() < 1e-10;
    assert!(close(number(&ultimate["design_load_factor"]), 0.75 * number(&ultimate["load_factor"])));
    assert!(close(number(&ultimate["utilisation"]), 1.0 / number(&ultimate["design_load_factor"])));
    let ratio = number(&ultimate["load_factor"]) / number(&elastic["load_factor"]);
    assert!(close(number(&case["ultimate_over_elastic"]), ratio));
    assert_eq!(ultimate["states"][0]["load_factor"], ultimate["load_factor"]);
}

#[test]
fn a_file_that_cannot_be_read_is_a_fault_in_the_json() {
    let desk = Desk::new("json-fault");
    let json = desk.run(&["check", "missing.toml", "--format", "json"]).ends_with(2).json();
    assert_eq!(json["joints"].as_array().unwrap().len(), 0);
    assert_eq!(json["faults"][0]["file"], "missing.toml");
    assert!(json["faults"][0]["line"].is_null());
}

#[test]
fn the_element_table_sums_to_the_given_load() {
    let desk = Desk::new("elements-csv");
    desk.put("a.toml", BRACKET);
    desk.run(&["check", "a.toml", "--elements-csv", "e.csv", "-o", "out.txt"]).ends_with(0);
    let text = desk.read("e.csv");
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let titles = reader.headers().unwrap().clone();
    let rows: Vec<csv::StringRecord> = reader.records().map(Result::unwrap).collect();
    let column = |title: &str| titles.iter().position(|name| name == title).unwrap();
    let sum = |title: &str| -> f64 {
        let crane = rows.iter().filter(|row| &row[column("case")] == "crane");
        crane.map(|row| row[column(title)].parse::<f64>().unwrap()).sum()
    };
    for method in ["", "elastic_"] {
        for (name, expected) in [("fx_kN", 0.0), ("fy_kN", -60.0), ("fz_kN", 0.0), ("mz_kN_m", -12.0)] {
            let found = sum(&format!("{method}{name}"));
            // Twelve digits of a hundred elements, and the tolerance of the solver.
            assert!((found - expected).abs() < 1e-6, "{method}{name} {found}");
        }
    }
    assert!((sum("length_mm") - 400.0).abs() < 1e-8);
    let ratios = rows.iter().map(|row| row[column("elastic_ratio")].parse::<f64>().unwrap());
    assert!(ratios.fold(0.0, f64::max) <= 1.0 + 1e-9);
    assert_eq!(desk.names(), ["a.toml", "e.csv", "out.txt"]);
}

#[test]
fn an_element_table_on_standard_output_stands_alone() {
    let desk = Desk::new("elements-stdout");
    desk.put("a.toml", BRACKET);
    let outcome = desk.run(&["check", "a.toml", "--elements-csv", "-"]).ends_with(0);
    assert!(outcome.stdout.starts_with("joint,case,weld,element,x_mm,"), "{}", outcome.stdout);
    assert!(!outcome.stdout.contains("SATISFIED"));
}

#[test]
fn the_summary_has_one_row_per_case() {
    let desk = Desk::new("summary");
    desk.put("a.toml", BRACKET);
    let text = desk.run(&["check", "a.toml", "--format", "csv"]).ends_with(0).stdout;
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let rows: Vec<csv::StringRecord> = reader.records().map(Result::unwrap).collect();
    let names: Vec<&str> = rows.iter().map(|row| &row[1]).collect();
    assert_eq!(names, ["crane", "wind"]);
    assert!(rows.iter().all(|row| &row[2] == "satisfied"), "{text}");
}

#[test]
fn the_text_keeps_to_the_width_asked_for() {
    let desk = Desk::new("width");
    desk.put("a.toml", BRACKET);
    for width in [72, 80, 132] {
        let text = desk.run(&["check", "a.toml", "--all-cases", "--width", &width.to_string()]).stdout;
        for line in text.lines() {
            assert!(line.chars().count() <= width, "{width}: {line}");
        }
    }
}

#[test]
fn the_same_input_gives_the_same_bytes() {
    let desk = Desk::new("repeat");
    desk.put("a.toml", BRACKET);
    let arguments = ["check", "a.toml", "--format", "json"];
    assert_eq!(desk.run(&arguments).stdout, desk.run(&arguments).stdout);
}
