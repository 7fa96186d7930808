//! Reading and writing: what goes wrong with files is said, and nothing is left half-written.

use super::{BRACKET, Desk};
use std::fs;
use std::process::Stdio;

#[test]
fn a_file_that_cannot_be_read_is_named_and_gives_no_answer() {
    let desk = Desk::new("unreadable");
    desk.put("latin.toml", b"title = \"Tr\xe4ger\"\n");
    fs::create_dir(desk.directory.join("folder")).unwrap();
    for (file, reason) in [
        ("missing.toml", "there is no such file"),
        ("folder", "this is a directory"),
        ("latin.toml", "not UTF-8 text"),
    ] {
        let outcome = desk.run(&["check", file]).ends_with(2);
        assert!(outcome.stderr.contains(reason) && outcome.stderr.contains(file), "{}", outcome.stderr);
        assert!(outcome.stdout.is_empty(), "{}", outcome.stdout);
    }
}

#[test]
fn messages_carry_no_colour_codes_when_they_are_piped() {
    let outcome = Desk::new("colour").run(&["check", "missing.toml"]).ends_with(2);
    assert!(!outcome.stderr.contains('\u{1b}'), "{:?}", outcome.stderr);
}

#[test]
fn wrong_usage_is_no_answer() {
    let desk = Desk::new("usage");
    for arguments in [
        &["check"][..],
        &["check", "--demo", "a.toml"],
        &["check", "--demo", "--set", "b"],
        &["check", "--demo", "--elements", "0"],
        &["check", "--demo", "--format", "pdf"],
        &["check", "-", "-"],
        &["verify"],
        &[],
    ] {
        let outcome = desk.run(arguments).ends_with(2);
        assert!(outcome.stdout.is_empty() && !outcome.stderr.is_empty(), "{arguments:?}");
    }
}

#[test]
fn help_is_a_result_and_states_the_limits() {
    let outcome = Desk::new("help").run(&["--help"]).ends_with(0);
    assert!(
        outcome.stdout.contains("no fatigue") && outcome.stdout.contains("Exit status"),
        "{}",
        outcome.stdout
    );
}

#[test]
fn a_starter_is_written_but_never_over_an_existing_file() {
    let desk = Desk::new("starter");
    let printed = desk.run(&["new"]).ends_with(0).stdout;
    desk.run(&["new", "-o", "a.toml"]).ends_with(0);
    assert_eq!(desk.read("a.toml"), printed);
    desk.put("a.toml", "mine");
    let refused = desk.run(&["new", "-o", "a.toml"]).ends_with(2);
    assert!(refused.stderr.contains("exists already") && refused.stderr.contains("--force"));
    assert_eq!(desk.read("a.toml"), "mine");
    desk.run(&["new", "--demo", "--force", "-o", "a.toml"]).ends_with(0);
    assert_eq!(desk.read("a.toml"), desk.run(&["new", "--demo"]).stdout);
    assert_eq!(desk.names(), ["a.toml"]);
}

#[test]
fn an_output_that_cannot_be_written_is_no_answer_and_leaves_nothing_behind() {
    let desk = Desk::new("unwritable");
    desk.put("locked.json", "old");
    let locked = desk.directory.join("locked.json");
    let mut permissions = fs::metadata(&locked).unwrap().permissions();
    permissions.set_readonly(true);
    fs::set_permissions(&locked, permissions).unwrap();
    fs::create_dir(desk.directory.join("folder")).unwrap();
    for (file, reason) in [
        ("nowhere/out.json", "its directory does not exist"),
        ("folder", "it is a directory"),
        ("locked.json", "permission is denied"),
    ] {
        let outcome = desk.run(&["check", "--demo", "--format", "json", "-o", file]).ends_with(2);
        assert!(outcome.stderr.contains(reason) && outcome.stderr.contains(file), "{}", outcome.stderr);
    }
    assert_eq!(desk.read("locked.json"), "old");
    assert_eq!(desk.names(), ["folder", "locked.json"]);
}

#[test]
fn results_replace_a_file_whole() {
    let desk = Desk::new("replaced");
    desk.put("out.json", "x".repeat(100_000));
    desk.run(&["rules", "--format", "json", "-o", "out.json"]).ends_with(0);
    assert_eq!(desk.read("out.json"), desk.run(&["rules", "--format", "json"]).stdout);
    assert_eq!(desk.names(), ["out.json"]);
}

#[test]
fn results_never_replace_a_joint_file_or_each_other() {
    let desk = Desk::new("clash");
    desk.put("a.toml", BRACKET);
    for arguments in [
        &["check", "a.toml", "-o", "./a.toml"][..],
        &["check", "a.toml", "--elements-csv", "a.toml"],
        &["check", "a.toml", "-o", "out", "--elements-csv", "./out"],
        &["check", "a.toml", "-o", "-", "--elements-csv", "-"],
    ] {
        desk.run(arguments).ends_with(2);
        assert_eq!(desk.read("a.toml"), BRACKET);
        assert_eq!(desk.names(), ["a.toml"], "{arguments:?}");
    }
}

#[cfg(unix)]
#[test]
fn a_device_is_written_in_place() {
    use std::os::unix::fs::FileTypeExt;
    Desk::new("device").run(&["new", "-o", "/dev/null"]).ends_with(0);
    assert!(fs::metadata("/dev/null").unwrap().file_type().is_char_device());
}

#[test]
fn a_reader_that_stops_early_is_no_error() {
    let desk = Desk::new("pipe");
    for arguments in [&["new"][..], &["rules"], &["--help"]] {
        let mut child =
            desk.command(arguments).stdout(Stdio::piped()).stderr(Stdio::piped()).spawn().unwrap();
        drop(child.stdout.take());
        let output = child.wait_with_output().unwrap();
        assert_eq!(output.status.code(), Some(0), "{arguments:?}");
        assert!(output.stderr.is_empty(), "{arguments:?}");
    }
}

#[test]
fn an_unknown_rule_set_is_answered_with_the_known_ones() {
    let outcome = Desk::new("unknown-rules").run(&["rules", "aisc-1066"]).ends_with(2);
    assert!(outcome.stderr.contains("aisc-1066") && outcome.stderr.contains("aisc-360-22-lrfd"));
}

#[test]
fn every_listed_rule_set_and_law_can_be_shown() {
    let desk = Desk::new("rules");
    let list = desk.run(&["rules"]).ends_with(0).stdout;
    let json = desk.run(&["rules", "--format", "json"]).ends_with(0).json();
    let entries = json["rules"].as_array().unwrap().iter().chain(json["laws"].as_array().unwrap());
    for id in entries.map(|entry| entry["id"].as_str().unwrap()) {
        assert!(list.contains(id), "{id}");
        let one = desk.run(&["rules", id]).ends_with(0).stdout;
        assert!(one.starts_with(id), "{one}");
        let lines_fit = one.lines().all(|line| line.chars().count() <= 80);
        assert!(lines_fit, "{one}");
    }
}
