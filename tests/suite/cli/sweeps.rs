//! The command `sweep`: what is varied, its forms, its exit status and its faults.

use super::{BRACKET, Desk};

/// The bracket with a parameter for the place of the load.
fn bracket() -> String {
    BRACKET
        .replace("p = \"60 kN\"", "p = \"60 kN\"\nreach = \"250 mm\"")
        .replace("[250, 100]", "[\"reach\", 100]")
}

#[test]
fn a_parameter_is_varied_and_the_worst_point_sets_the_status() {
    let desk = Desk::new("sweep-status");
    desk.put("a.toml", bracket());
    let outcome = desk.run(&["sweep", "a.toml", "--vary", "reach=150mm:250mm:3"]).ends_with(0);
    assert!(outcome.stdout.starts_with("SWEEP       Two lines\n"), "{}", outcome.stdout);
    assert!(outcome.stdout.contains("reach from 150 mm to 250 mm, 3 values; 250 mm as given"));
    assert!(outcome.stdout.contains("licensed engineer"), "{}", outcome.stdout);
    assert!(outcome.stderr.is_empty(), "{}", outcome.stderr);
    let outcome = desk.run(&["sweep", "a.toml", "--vary", "p=60kN:600kN:2"]).ends_with(1);
    assert!(outcome.stdout.contains("2 points: 1 satisfied, 1 exceeded"), "{}", outcome.stdout);
    let outcome = desk.run(&["sweep", "a.toml", "--vary", "reach=2e8 mm:250mm:2"]).ends_with(2);
    assert!(outcome.stdout.contains("1 without an answer"), "{}", outcome.stdout);
    assert!(outcome.stderr.contains("at 1 point: reach = 200000000 mm"), "{}", outcome.stderr);
}

#[test]
fn a_point_is_what_check_says_with_set() {
    let desk = Desk::new("sweep-check");
    desk.put("a.toml", bracket());
    let sweep = desk.run(&["sweep", "a.toml", "--vary", "reach=200mm:300mm:3", "--format", "json"]).json();
    let check = desk.run(&["check", "a.toml", "--set", "reach=300mm", "--format", "json"]).json();
    let (point, joint) = (&sweep["sweep"]["points"][2], &check["joints"][0]);
    assert_eq!(point["governing"], joint["governing"]);
    for index in 0..2 {
        let (own, case) = (&point["cases"][index], &joint["cases"][index]);
        for key in ["case", "status", "verification", "ultimate_over_elastic"] {
            assert_eq!(own[key], case[key], "{key}");
        }
        for key in ["load_factor", "design_load_factor", "peak_load_factor", "centre"] {
            assert_eq!(own["ultimate"][key], case["ultimate"][key], "{key}");
        }
    }
}

#[test]
fn the_table_has_a_row_for_each_point_and_case() {
    let desk = Desk::new("sweep-csv");
    desk.put("a.toml", bracket());
    let run = ["sweep", "a.toml", "--vary", "load.angle=-90:0:3", "--vary", "reach=200mm:300mm:2"];
    let outcome = desk.run(&[&run[..], &["--format", "csv", "-o", "a.csv"]].concat()).ends_with(0);
    assert!(outcome.stdout.is_empty(), "{}", outcome.stdout);
    let table = desk.read("a.csv");
    assert!(table.starts_with("joint,load_angle_deg,reach_mm,case,status,"), "{table}");
    assert_eq!(table.lines().count(), 1 + 3 * 2 * 2);
    assert!(table.contains("\r\nTwo lines,-45,300,crane,satisfied,ultimate,"), "{table}");
    let alone = desk.run(&[&run[..], &["--format", "csv", "--case", "crane"]].concat()).ends_with(0).stdout;
    assert_eq!(alone.lines().count(), 1 + 3 * 2);
}

#[test]
fn the_options_of_check_hold_for_a_sweep() {
    let desk = Desk::new("sweep-options");
    desk.put("a.toml", bracket());
    let run = |options: &[&str]| {
        let json = ["sweep", "-", "--vary", "reach=200mm:300mm:2", "--format", "json"];
        desk.run_with_input(&[&json[..], options].concat(), bracket().as_bytes()).json()["sweep"].clone()
    };
    let strength =
        |sweep: &serde_json::Value| sweep["points"][1]["cases"][0]["ultimate"]["load_factor"].clone();
    let plain = run(&[]);
    assert_eq!((&plain["file"], &plain["rules"]), (&"-".into(), &"aisc-360-22-lrfd".into()));
    let other = run(&["--rules", "nominal", "--law", "rigid-plastic", "--set", "p=30kN"]);
    assert_eq!((&other["rules"], &other["law"]), (&"nominal".into(), &"rigid-plastic".into()));
    assert!(strength(&other).as_f64() > strength(&plain).as_f64());
    assert_ne!(strength(&run(&["--elements", "10"])), strength(&plain));
    let narrow =
        desk.run(&["sweep", "--demo", "--vary", "arm=1mm:2mm:2", "--width", "72"]).ends_with(0).stdout;
    assert!(narrow.lines().all(|line| line.chars().count() <= 72), "{narrow}");
}

#[test]
fn faults_of_a_range_are_told_like_those_of_set() {
    let desk = Desk::new("sweep-faults");
    desk.put("a.toml", bracket());
    for (range, said) in [
        ("reach=100:250mm:3", "give 100 a unit: 100 mm"),
        ("raech=100mm:250mm:3", "did you mean `reach`?"),
        ("reach=100mm:250mm:1", "2 to 10000"),
        ("reach=100mm:250mm", "`NAME=FROM:TO:COUNT`"),
        ("load.angle=0:1 m:3", "`load.angle` is an angle, but `1 m` is a length"),
    ] {
        let outcome = desk.run(&["sweep", "a.toml", "--vary", range]).ends_with(2);
        assert!(outcome.stdout.is_empty(), "{}", outcome.stdout);
        assert!(outcome.stderr.contains(said) && outcome.stderr.contains("--vary"), "{}", outcome.stderr);
    }
    let outcome =
        desk.run(&["sweep", "a.toml", "--vary", "reach=1mm:2mm:1", "--format", "json"]).ends_with(2);
    assert!(outcome.json()["sweep"].is_null() && outcome.json()["faults"].as_array().unwrap().len() == 1);
    desk.run(&["sweep", "a.toml"]).ends_with(2);
    desk.run(&["sweep", "--vary", "reach=1mm:2mm:3"]).ends_with(2);
    let outcome = desk.run(&["sweep", "missing.toml", "--vary", "reach=1mm:2mm:3"]).ends_with(2);
    assert!(outcome.stderr.contains("there is no such file"), "{}", outcome.stderr);
}

#[test]
fn the_results_never_replace_the_joint_file() {
    let desk = Desk::new("sweep-replace");
    desk.put("a.toml", bracket());
    let outcome = desk.run(&["sweep", "a.toml", "--vary", "reach=1mm:2mm:3", "-o", "./a.toml"]).ends_with(2);
    assert!(outcome.stderr.contains("would replace a joint file"), "{}", outcome.stderr);
    assert_eq!(desk.read("a.toml"), bracket());
}
