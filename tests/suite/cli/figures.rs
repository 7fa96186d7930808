//! `--figure`: what is drawn where, and what is refused before anything is computed or written.

use super::{BRACKET, Desk};
use std::fs;

#[test]
fn the_ending_chooses_the_form_and_the_verdict_the_status() {
    let desk = Desk::new("figure-forms");
    desk.put("a.toml", BRACKET);
    let outcome = desk.run(&["check", "a.toml", "--figure", "a.svg"]).ends_with(0);
    assert!(outcome.stdout.starts_with("SATISFIED   Two lines\n"), "{}", outcome.stdout);
    assert!(desk.read("a.svg").starts_with("<svg ") && desk.read("a.svg").contains(">SATISFIED</text>"));
    desk.run(&["check", "a.toml", "--set", "p=600 kN", "--figure", "b.svg"]).ends_with(1);
    assert!(desk.read("b.svg").contains(">EXCEEDED</text>"));
    assert_eq!(desk.names(), ["a.svg", "a.toml", "b.svg"]);
}

#[cfg(feature = "png")]
#[test]
fn a_png_is_written() {
    let desk = Desk::new("figure-png");
    desk.put("a.toml", BRACKET);
    desk.run(&["check", "a.toml", "--figure", "A.PNG"]).ends_with(0);
    desk.run(&["sweep", "a.toml", "--vary", "p=60kN:70kN:2", "--figure", "sweep.png"]).ends_with(0);
    for name in ["A.PNG", "sweep.png"] {
        assert!(fs::read(desk.directory.join(name)).unwrap().starts_with(b"\x89PNG\r\n\x1a\n"));
    }
}

#[test]
fn a_dash_takes_the_place_of_the_results() {
    let desk = Desk::new("figure-dash");
    desk.put("a.toml", BRACKET);
    let alone = desk.run(&["check", "a.toml", "--figure", "-"]).ends_with(0);
    assert!(alone.stdout.starts_with("<svg ") && alone.stdout.ends_with("</svg>\n"));
    let beside = desk.run(&["check", "a.toml", "--figure", "-", "-o", "a.txt"]).ends_with(0);
    assert_eq!(beside.stdout, alone.stdout);
    assert!(desk.read("a.txt").starts_with("SATISFIED"));
    let sweep = desk.run(&["sweep", "a.toml", "--vary", "p=60kN:70kN:2", "--figure", "-"]).ends_with(0);
    assert!(sweep.stdout.starts_with("<svg ") && sweep.stdout.ends_with("</svg>\n"));
}

#[test]
fn the_case_asked_for_is_drawn() {
    let desk = Desk::new("figure-case");
    desk.put("a.toml", BRACKET);
    desk.run(&["check", "a.toml", "--figure", "a.svg"]).ends_with(0);
    desk.run(&["check", "a.toml", "--figure", "b.svg", "--case", "wind"]).ends_with(0);
    assert!(
        desk.read("a.svg").contains(">Case crane</text>") && desk.read("b.svg").contains(">Case wind</text>")
    );
    let outcome = desk.run(&["check", "a.toml", "--figure", "c.svg", "--case", "winf"]).ends_with(2);
    assert!(outcome.stderr.contains("there is no case or combination `winf`"), "{}", outcome.stderr);
    assert!(outcome.stderr.contains("accepted: `crane`, `wind`"), "{}", outcome.stderr);
    assert!(outcome.stdout.starts_with("SATISFIED"), "the results are not lost: {}", outcome.stdout);
    assert_eq!(desk.names(), ["a.svg", "a.toml", "b.svg"]);
}

#[test]
fn what_cannot_be_drawn_is_refused_with_what_is_accepted() {
    let desk = Desk::new("figure-refused");
    desk.put("a.toml", BRACKET);
    desk.put("b.toml", BRACKET);
    for (arguments, reason) in [
        (&["check", "a.toml", "--figure", "a.pdf"][..], "ends in .svg or .png"),
        (&["check", "a.toml", "--figure", "figure"], "ends in .svg or .png"),
        (&["check", "a.toml", "b.toml", "--figure", "a.svg"], "one figure shows one joint"),
        (
            &["check", "a.toml", "--figure", "a.svg", "-o", "a.svg"],
            "two results cannot share one destination",
        ),
        (
            &["check", "a.toml", "--figure", "-", "--elements-csv", "-"],
            "two results cannot share one destination",
        ),
        (&["check", "a.toml", "--figure", "nowhere/a.svg"], "its directory does not exist"),
        (&["check", "a.toml", "--case", "crane"], "--figure"),
        (&["sweep", "a.toml", "--vary", "p=60kN:70kN:2", "--figure", "a.jpg"], "ends in .svg or .png"),
    ] {
        let outcome = desk.run(arguments).ends_with(2);
        assert!(outcome.stderr.contains(reason), "{arguments:?}: {}", outcome.stderr);
        assert_eq!(desk.names(), ["a.toml", "b.toml"], "{arguments:?}");
    }
}

#[test]
fn a_figure_that_cannot_be_written_takes_no_results_with_it() {
    let desk = Desk::new("figure-lost");
    desk.put("a.toml", BRACKET);
    let outcome = desk
        .run(&["sweep", "a.toml", "--vary", "p=60kN:70kN:2", "--figure", "nowhere/a.svg", "-o", "a.txt"])
        .ends_with(2);
    assert!(outcome.stderr.contains("nowhere/a.svg"), "{}", outcome.stderr);
    assert!(desk.read("a.txt").starts_with("SWEEP"));
}
