//! README.md is kept: its commands are run and their output compared, its joint files read, its numbers computed.
//!
//! * ```` ```toml ```` blocks begin with `# NAME.toml` (a whole file) or `# add to NAME.toml`; each is read and
//!   laid on one desk, in the order of the text.
//! * ```` ```console ```` blocks are commands behind `$ `, run by a shell on that desk, and what they say. A line
//!   of three dots stands for any lines. Numbers of nine digits and more are compared to eight.
//! * The tables of the headline and of the validation are computed again.

use std::fs;
use std::path::{Path, PathBuf};
use std::process::{Command, Stdio};
use weldpole::analysis::{CaseReport, Report, analyse};
use weldpole::input::{Options, read_joint};

/// Digits of the last places differ between mathematical libraries; the solver promises 1e-9.
const LAST_PLACES: f64 = 1e-8;
/// Significant digits from which a number is compared by value.
const LONG_NUMBER: usize = 9;

struct Block {
    kind: String,
    line: usize,
    text: String,
}

fn root() -> &'static Path {
    Path::new(env!("CARGO_MANIFEST_DIR"))
}

fn readme() -> String {
    fs::read_to_string(root().join("README.md")).unwrap()
}

fn blocks() -> Vec<Block> {
    let mut blocks: Vec<Block> = Vec::new();
    let mut open = false;
    for (number, line) in readme().lines().enumerate() {
        if let Some(kind) = line.strip_prefix("```") {
            if !open {
                blocks.push(Block { kind: kind.to_owned(), line: number + 1, text: String::new() });
            }
            open = !open;
        } else if open {
            let block = blocks.last_mut().unwrap();
            block.text.push_str(line);
            block.text.push('\n');
        }
    }
    assert!(!open, "a block of the README is not closed");
    blocks
}

/// The joint files of the README: name and contents, after what is added to them by later blocks.
fn joint_files() -> Vec<(String, String)> {
    let mut files: Vec<(String, String)> = Vec::new();
    for block in blocks().iter().filter(|block| block.kind == "toml") {
        let heading = block.text.lines().next().unwrap().trim_start_matches("# ").to_owned();
        match heading.strip_prefix("add to ") {
            None => files.push((heading, block.text.clone())),
            Some(base) => {
                let (_, contents) = files.iter().find(|(name, _)| name == base).unwrap();
                files.push((format!("added-to-{base}"), format!("{contents}\n{}", block.text)));
            }
        }
    }
    files
}

fn desk(test: &str) -> PathBuf {
    let directory = Path::new(env!("CARGO_TARGET_TMPDIR")).join("readme").join(test);
    let _ = fs::remove_dir_all(&directory);
    fs::create_dir_all(&directory).unwrap();
    for (name, contents) in joint_files() {
        fs::write(directory.join(name), contents).unwrap();
    }
    directory
}

/// Runs a command line of the README as a person would; standard error and standard output in one text.
fn run(command: &str, directory: &Path) -> String {
    let program = Path::new(env!("CARGO_BIN_EXE_weldpole"));
    let mut path = program.parent().unwrap().as_os_str().to_owned();
    path.push(":");
    path.push(std::env::var_os("PATH").unwrap_or_default());
    let output = Command::new("sh")
        .args(["-c", &format!("exec 2>&1; {command}")])
        .current_dir(directory)
        .env("PATH", path)
        .env_remove("COLUMNS")
        .env_remove("NO_COLOR")
        .stdin(Stdio::null())
        .output()
        .unwrap();
    String::from_utf8(output.stdout).unwrap()
}

/// Commands of a console block with the output shown for each.
fn commands(block: &Block) -> Vec<(String, Vec<String>)> {
    let mut commands: Vec<(String, Vec<String>)> = Vec::new();
    for line in block.text.lines() {
        match line.strip_prefix("$ ") {
            Some(command) => commands.push((command.to_owned(), Vec::new())),
            None => {
                commands.last_mut().expect("a console block begins with a command").1.push(line.to_owned())
            }
        }
    }
    commands
}

/// Words and long numbers of a line apart: the text with a mark in place of each long number, and the numbers.
fn without_long_numbers(line: &str) -> (String, Vec<f64>) {
    let mut text = String::new();
    let mut numbers = Vec::new();
    let mut rest = line.trim_end();
    while !rest.is_empty() {
        let digits = |c: char| c.is_ascii_digit() || c == '.';
        let length = rest.find(|c| !digits(c)).unwrap_or(rest.len());
        if length == 0 {
            let length = rest.find(digits).unwrap_or(rest.len());
            text.push_str(&rest[..length]);
            rest = &rest[length..];
            continue;
        }
        let (number, behind) = rest.split_at(length);
        let significant = number.replace('.', "").trim_start_matches('0').len();
        match number.parse() {
            Ok(value) if significant >= LONG_NUMBER => {
                text.push('#');
                numbers.push(value);
            }
            _ => text.push_str(number),
        }
        rest = behind;
    }
    (text, numbers)
}

fn same_line(shown: &str, found: &str) -> bool {
    let ((shown, a), (found, b)) = (without_long_numbers(shown), without_long_numbers(found));
    let close = |(a, b): (&f64, &f64)| (a - b).abs() <= LAST_PLACES * a.abs();
    shown == found && a.len() == b.len() && a.iter().zip(&b).all(close)
}

/// Whether `found` is what is shown, with any lines in place of each line of dots.
fn same_output(shown: &[String], found: &[&str]) -> bool {
    match shown.split_first() {
        None => found.is_empty(),
        Some((first, rest)) if first == "..." => {
            (0..=found.len()).any(|skipped| same_output(rest, &found[skipped..]))
        }
        Some((first, rest)) => found
            .split_first()
            .is_some_and(|(line, others)| same_line(first, line) && same_output(rest, others)),
    }
}

fn report(text: &str) -> Report {
    let joint = read_joint("readme.toml", text, &Options::default());
    analyse(&joint.map_err(|faults| format!("{faults:?}\n{text}")).unwrap())
}

fn only_case(report: &Report) -> &CaseReport {
    assert_eq!(report.cases.len(), 1);
    &report.cases[0]
}

#[test]
fn every_command_gives_what_is_shown() {
    let desk = desk("commands");
    let mut count = 0;
    for block in blocks().iter().filter(|block| block.kind == "console") {
        for (command, shown) in commands(block) {
            let found = run(&command, &desk);
            let lines: Vec<&str> = found.lines().collect();
            assert!(
                same_output(&shown, &lines),
                "README.md, block at line {}: `{command}` says\n{found}\nshown:\n{}",
                block.line,
                shown.join("\n")
            );
            count += 1;
        }
    }
    assert!(count >= 10, "only {count} commands");
}

#[test]
fn every_joint_file_is_read_and_analysed_but_the_one_that_shows_mistakes() {
    let files = joint_files();
    assert!(files.len() >= 4, "{}", files.len());
    for (name, text) in files {
        if name == "slip.toml" {
            assert_eq!(read_joint(&name, &text, &Options::default()).unwrap_err().len(), 2);
        } else {
            assert!(only_case(&report(&text)).ultimate().is_some(), "{name}");
        }
    }
}

#[test]
fn every_block_is_of_a_kind_that_is_checked() {
    for block in blocks() {
        assert!(["toml", "console", "sh"].contains(&block.kind.as_str()), "line {}", block.line);
    }
}

#[test]
fn the_two_commands_stand_on_the_first_screen() {
    let text = readme();
    let first: String = text.lines().take(45).collect::<Vec<_>>().join("\n");
    for command in ["cargo run --release -- check --demo", "cargo test --release"] {
        assert!(first.contains(command), "{command}");
    }
}

#[test]
fn prose_is_of_a_readable_width() {
    let text = readme();
    // Parts of odd number stand between fences: output is as wide as the program makes it.
    let prose = text.split("```").step_by(2).flat_map(str::lines);
    for line in prose.filter(|line| !line.starts_with('|')) {
        assert!(line.chars().count() <= 105, "{line}");
    }
}

#[test]
fn links_lead_to_files() {
    let text = readme();
    for (at, _) in text.match_indices("](") {
        let target = text[at + 2..].split(')').next().unwrap();
        if !target.starts_with('#') {
            assert!(root().join(target).exists(), "{target}");
        }
    }
}

/// The row of a table that begins with these words, its cells trimmed.
fn row(beginning: &str) -> Vec<String> {
    let text = readme();
    let mut rows = text.lines().filter(|line| line.trim_start_matches("| ").starts_with(beginning));
    let found = rows.next().unwrap_or_else(|| panic!("no row `{beginning}`"));
    found.trim_matches('|').split('|').map(|cell| cell.trim().to_owned()).collect()
}

#[test]
fn the_headline_is_what_the_program_computes() {
    let (_, text) = joint_files().into_iter().find(|(name, _)| name == "bracket.toml").unwrap();
    let report = report(&text);
    let case = only_case(&report);
    // The load is 80 kip.
    let kip = |strength: weldpole::analysis::Strength| 80.0 * strength.design_load_factor.unwrap();
    let ultimate = kip(case.ultimate_strength(&report.joint).unwrap());
    let elastic = kip(case.elastic_strength(&report.joint).unwrap());
    let coefficient = case.coefficients(&report.joint).unwrap().handbook.unwrap();
    assert_eq!(row("instantaneous centre |")[2], format!("{ultimate:.1} kip (C = {coefficient:.3})"));
    assert_eq!(row("elastic vector method |")[2], format!("{elastic:.1} kip"));
    // Independent of the solver: phi times the printed coefficient, 6 sixteenths, 10 in.
    assert!(row("instantaneous centre |")[1].contains(&format!("{:.1} kip", 0.75 * 1.88 * 6.0 * 10.0)));
    assert_eq!((format!("{ultimate:.1}"), format!("{elastic:.1}")), ("84.2".into(), "47.3".into()));
}

/// A group of 1/16 in welds of E70 in inches under a force of 1 kip down.
fn sixteenth(paths: &[&[[f64; 2]]], at: [f64; 2]) -> String {
    let welds: String = paths
        .iter()
        .enumerate()
        .map(|(index, path)| format!("[[weld]]\nname = \"w{index}\"\nleg = \"1/16 in\"\npath = {path:?}\n"))
        .collect();
    let load = format!("[[load]]\ncase = \"x\"\nat = {at:?}\nforce = [0, -1]\n");
    format!("units = \"us\"\nrules = \"nominal\"\n[filler]\nclass = \"E70\"\n{welds}{load}")
}

/// C = R_n / (D l) of one leg of 1/16 in, kip/in.
fn coefficient(paths: &[&[[f64; 2]]], at: [f64; 2], l: f64) -> f64 {
    only_case(&report(&sixteenth(paths, at))).ultimate().unwrap().governing().load_factor / l
}

/// C shape of height l and returns k l, the load a l from its centroid.
fn c_shape(l: f64, k: f64, a: f64) -> f64 {
    let returns = k * l;
    let centroid = returns * returns / (2.0 * returns + l);
    let path: &[[f64; 2]] = &[[returns, 0.0], [0.0, 0.0], [0.0, l], [returns, l]];
    coefficient(&[path], [centroid + a * l, 0.5 * l], l)
}

/// Throat for an allowable stress of 100 MPa, mm: that of welds of 1 mm throat over the load factor.
fn throat(paths: &str, at: [f64; 2], force: f64) -> f64 {
    let text = format!(
        "units = \"metric\"\nrules = \"nominal\"\n[filler]\nstrength = \"100 MPa / 0.6\"\n{paths}[[load]]\n\
         case = \"x\"\nat = {at:?}\nforce = [0, {force:?}]\n"
    );
    1.0 / only_case(&report(&text)).elastic().unwrap().load_factor
}

/// One computed row of the validation table: how its line begins, its value, the decimals it is shown with.
#[test]
fn the_validation_table_is_what_the_program_computes() {
    let (l, k, a) = (11.5, 0.348, 0.319);
    let foot = k * l;
    let centroid = [0.5 * foot * foot / (l + foot), 0.5 * l * l / (l + foot)];
    let l_shape: &[[f64; 2]] = &[[foot, 0.0], [0.0, 0.0], [0.0, l]];
    let line: &[[f64; 2]] = &[[0.0, 0.0], [0.0, 23.5]];
    let (_, bracket) = joint_files().into_iter().find(|(name, _)| name == "bracket.toml").unwrap();
    let bracket = report(&bracket);
    let elastic = 80.0 * only_case(&bracket).elastic().unwrap().load_factor;
    let leg_throat = bracket.joint.group.welds()[0].size.throat();
    let weld = |name: &str, path: &str| format!("[[weld]]\nname = \"{name}\"\nthroat = 1\npath = {path}\n");
    let pair = weld("lower", "[[0, 0], [50, 0]]") + &weld("upper", "[[0, 50], [50, 50]]");
    let c = weld("c", "[[50, 0], [0, 0], [0, 100], [50, 100]]");
    let rows = [
        ("AISC Companion v16.0, II.A-26", c_shape(10.0, 0.5, 0.875), 3),
        ("II.A-10", c_shape(8.5, 0.294, 0.372), 3),
        ("II.C-1", c_shape(15.0, 0.204, 0.644), 3),
        ("II.A-29", coefficient(&[l_shape], [centroid[0] + a * l, centroid[1]], l), 3),
        ("II.A-2A", coefficient(&[line, line], [0.17 * 23.5, 0.5 * 23.5], 23.5), 3),
        ("II.A-27, elastic, LRFD", 0.75 * elastic, 2),
        ("II.A-27, elastic, ASD", 0.50 * elastic, 2),
        ("II.A-27, line properties", bracket.section.j / leg_throat / 25.4_f64.powi(3), 1),
        ("Bhandari, Design of Machine Elements, Ex. 8.9", throat(&pair, [150.0, 25.0], -7.5), 6),
        ("Bhandari, Ex. 8.10", throat(&c, [200.0, 50.0], -60.0), 6),
    ];
    for (beginning, value, decimals) in rows {
        let cells = row(beginning);
        assert_eq!(cells[3], format!("{value:.decimals$}"), "{beginning}");
        let published: f64 = cells[2].parse().unwrap();
        let percent = format!("{:+.1} %", 100.0 * (value / published - 1.0));
        let shown = if percent.ends_with("0.0 %") { "0".to_owned() } else { percent };
        assert_eq!(cells[4], shown, "{beginning}");
    }
}

#[test]
fn the_comparison_finds_differences() {
    let shown = |lines: &[&str]| lines.iter().map(|line| (*line).to_owned()).collect::<Vec<_>>();
    assert!(same_output(&shown(&["a", "...", "c"]), &["a", "b", "b", "c"]));
    assert!(same_output(&shown(&["..."]), &[]));
    assert!(!same_output(&shown(&["a", "c"]), &["a", "b", "c"]));
    assert!(!same_output(&shown(&["a", "...", "c"]), &["a", "b"]));
    assert!(!same_output(&shown(&["a"]), &["a", "b"]));
    assert!(same_line("x 1.40389452443,", "x 1.40389452444,"));
    assert!(!same_line("x 1.40389452443,", "x 1.40389462443,"));
    assert!(!same_line("x 1.404", "x 1.405"));
    assert!(same_line("-80.000000 kip", "-80.000000 kip  "));
}
