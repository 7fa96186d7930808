//! Verdicts: exit status, and the first words a reader sees.

use super::{BRACKET, Desk};

#[test]
fn a_joint_that_holds_ends_with_zero_and_says_so_first() {
    let desk = Desk::new("satisfied");
    desk.put("a.toml", BRACKET);
    let outcome = desk.run(&["check", "a.toml"]).ends_with(0);
    assert!(outcome.stdout.starts_with("SATISFIED"), "{}", outcome.stdout);
    assert!(outcome.stdout.contains("licensed engineer"), "{}", outcome.stdout);
    assert!(outcome.stderr.is_empty(), "{}", outcome.stderr);
}

#[test]
fn a_joint_that_fails_ends_with_one_and_says_so_first() {
    let desk = Desk::new("exceeded");
    desk.put("a.toml", BRACKET);
    let outcome = desk.run(&["check", "a.toml", "--set", "p=600 kN"]).ends_with(1);
    assert!(outcome.stdout.starts_with("EXCEEDED"), "{}", outcome.stdout);
    assert!(outcome.stdout.contains("case crane"), "{}", outcome.stdout);
}

#[test]
fn a_bad_file_does_not_stop_the_others_and_outweighs_them() {
    let desk = Desk::new("mixed");
    desk.put("good.toml", BRACKET);
    desk.put("bad.toml", BRACKET.replace("leg = 6", "leeg = 6"));
    let outcome = desk.run(&["check", "bad.toml", "good.toml", "missing.toml"]).ends_with(2);
    assert!(outcome.stdout.starts_with("3 joints: 1 satisfied, 2 not read"), "{}", outcome.stdout);
    assert!(outcome.stderr.contains("bad.toml:13:1"), "{}", outcome.stderr);
    assert!(outcome.stderr.contains("leeg = 6") && outcome.stderr.contains("^^^^"), "{}", outcome.stderr);
    assert!(outcome.stderr.contains("missing.toml"), "{}", outcome.stderr);
    assert!(outcome.stderr.contains("2 of 3 files gave no answer"), "{}", outcome.stderr);
}

#[test]
fn several_joints_open_with_a_list_and_the_worst_sets_the_status() {
    let desk = Desk::new("several");
    desk.put("good.toml", BRACKET);
    desk.put("weak.toml", BRACKET.replace("60 kN", "600 kN").replace("Two lines", "Weak lines"));
    let outcome = desk.run(&["check", "good.toml", "weak.toml"]).ends_with(1);
    assert!(outcome.stdout.starts_with("2 joints: 1 satisfied, 1 exceeded"), "{}", outcome.stdout);
}

#[test]
fn standard_input_is_read_like_a_file() {
    let desk = Desk::new("stdin");
    desk.put("a.toml", BRACKET);
    let from_file = desk.run(&["check", "a.toml"]).ends_with(0).stdout;
    let piped = desk.run_with_input(&["check", "-"], BRACKET.as_bytes()).ends_with(0).stdout;
    assert_eq!(from_file.replace("a.toml", "-"), piped);
    desk.run_with_input(&["check", "-"], b"").ends_with(2);
}

#[test]
fn the_demonstration_is_the_file_that_new_writes() {
    let desk = Desk::new("demo");
    let built_in = desk.run(&["check", "--demo"]);
    assert!(matches!(built_in.status, Some(0 | 1)), "{}", built_in.stderr);
    desk.run(&["new", "--demo", "-o", "demo.toml"]).ends_with(0);
    let written = desk.run(&["check", "demo.toml"]);
    assert_eq!(built_in.stdout.replace("--demo", "demo.toml"), written.stdout);
}

#[test]
fn the_starter_can_be_checked_as_it_is() {
    let desk = Desk::new("starter-runs");
    desk.run(&["new", "-o", "a.toml"]).ends_with(0);
    let outcome = desk.run(&["check", "a.toml"]);
    assert!(matches!(outcome.status, Some(0 | 1)), "{}{}", outcome.stdout, outcome.stderr);
}

#[test]
fn a_load_of_zero_is_satisfied_with_a_utilisation_of_zero() {
    let desk = Desk::new("zero");
    desk.put("a.toml", BRACKET.replace("60 kN", "0 kN").replace("[10, 0]", "[0, 0]"));
    let json = desk.run(&["check", "a.toml", "--format", "json"]).ends_with(0).json();
    let case = &json["joints"][0]["cases"][0];
    assert_eq!(case["status"], "satisfied");
    assert_eq!(case["verification"]["utilisation"], 0.0);
    assert!(case["ultimate"]["load_factor"].is_null() && case["elastic"]["load_factor"].is_null());
}

#[test]
fn elements_approach_the_continuous_weld() {
    let desk = Desk::new("elements");
    desk.put("a.toml", BRACKET);
    let factor = |arguments: &[&str]| {
        let run = [&["check", "a.toml", "--format", "json"], arguments].concat();
        let json = desk.run(&run).json();
        json["joints"][0]["cases"][0]["ultimate"]["load_factor"].as_f64().unwrap()
    };
    let (continuous, elements) = (factor(&[]), factor(&["--elements", "200"]));
    // Mid-point elements converge at first order; 20 elements are off by half a percent at most.
    assert!((elements / continuous - 1.0).abs() < 0.002, "{elements} {continuous}");
}

#[test]
fn a_rule_set_that_does_not_accept_the_ultimate_analysis_rests_on_the_elastic_one_alone() {
    let desk = Desk::new("firewall");
    desk.put("a.toml", BRACKET);
    let rules = desk.run(&["rules", "--format", "json"]).json();
    let closed = rules["rules"].as_array().unwrap().iter().filter(|set| {
        let accepts = set["accepts"].as_array().unwrap();
        !accepts.iter().any(|basis| basis == "ultimate")
    });
    for set in closed {
        let id = set["id"].as_str().unwrap();
        let json = desk.run(&["check", "a.toml", "--rules", id, "--format", "json"]).json();
        for case in
            json["joints"].as_array().unwrap().iter().flat_map(|joint| joint["cases"].as_array().unwrap())
        {
            assert_eq!(case["ultimate"]["accepted"], false, "{id}");
            assert!(case["ultimate"]["utilisation"].is_null(), "{id}");
            assert!(case["ultimate"]["design_load_factor"].is_null(), "{id}");
            assert_ne!(case["verification"]["basis"], "ultimate", "{id}");
        }
    }
}
