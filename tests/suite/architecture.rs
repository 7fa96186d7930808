//! The shape of the sources: who may import whom, what the library may not call, how a file begins.
//!
//! The table [`MAY_USE`] is the project's own; DEVELOPERS.md shows it with the reasons. The checker works on
//! the text: comments and literals are blanked, `use crate::{a, b}` is expanded, `super` is resolved against
//! the module of the file. Tests beside the code obey the same import table, but may unwrap and panic.
//!
//! Outside tests `expect` is allowed with a proof: a message that says why it cannot fail, here or in a
//! constant of the file whose name begins with `PROOF`. `unwrap`, `panic!`, `todo!`, `unimplemented!` and
//! `unreachable!` are not.

use std::fs;
use std::path::{Path, PathBuf};

/// Module, and the modules of ours it may use.
const MAY_USE: [(&str, &[&str]); 12] = [
    ("units", &[]),
    ("numerics", &[]),
    ("diagnostic", &[]),
    ("model", &["units"]),
    ("input", &["units", "diagnostic", "model"]),
    ("mechanics", &["units", "numerics", "model"]),
    ("solvers", &["units", "numerics", "model", "mechanics"]),
    ("verify", &["units", "model", "solvers"]),
    ("analysis", &["units", "model", "mechanics", "solvers", "verify"]),
    ("study", &["units", "diagnostic", "model", "input", "analysis"]),
    ("output", &["units", "diagnostic", "model", "solvers", "verify", "analysis", "study"]),
    ("lib", &[]),
];

/// What the library leaves to its callers: the terminal, files, the environment, the clock, other processes.
const OUTSIDE_WORLD: [&str; 12] = [
    "println!",
    "eprintln!",
    "print!",
    "eprint!",
    "dbg!",
    "std::fs",
    "std::env",
    "std::io",
    "std::process",
    "std::net",
    "SystemTime",
    "Instant",
];

const NEVER: [&str; 6] = [".unwrap()", ".unwrap_err()", "panic!", "todo!", "unimplemented!", "unreachable!"];

/// Shortest message that can be a proof.
const SHORTEST_PROOF: usize = 25;
const MOST_LINES: usize = 500;

/// One source file as the checker sees it.
struct Source {
    /// Path below `src`, with `/`.
    path: String,
    text: String,
    /// The text without comments and the contents of literals, byte for byte as long.
    code: String,
}

impl Source {
    fn new(path: &str, text: &str) -> Self {
        Self { path: path.to_owned(), text: text.to_owned(), code: blanked(text) }
    }

    /// Path of the module, for example `["input", "check"]`.
    fn module(&self) -> Vec<String> {
        let stem = self.path.trim_end_matches(".rs");
        let mut parts: Vec<String> = stem.split('/').map(str::to_owned).collect();
        if parts.last().is_some_and(|last| last == "mod") {
            parts.pop();
        }
        parts
    }

    fn top(&self) -> String {
        self.module()[0].clone()
    }

    /// Whether the file belongs to the binary.
    fn is_command_line(&self) -> bool {
        matches!(self.top().as_str(), "main" | "cli")
    }

    fn line_at(&self, byte: usize) -> usize {
        self.text[..byte].matches('\n').count() + 1
    }

    /// Where code for tests alone begins: at a `#[cfg(test)]` on a module with a body, which ends the file.
    fn tests_begin(&self) -> usize {
        if self.path.ends_with("fixture.rs") {
            return 0;
        }
        let mut from = 0;
        while let Some(found) = self.code[from..].find("#[cfg(test)]") {
            let at = from + found;
            let behind = &self.code[at..];
            let (brace, semicolon) = (behind.find('{'), behind.find(';'));
            if brace.is_some_and(|brace| semicolon.is_none_or(|semicolon| brace < semicolon)) {
                return at;
            }
            from = at + 1;
        }
        self.code.len()
    }
}

/// Blanks comments, texts and characters with spaces; keeps line breaks and the quotes.
fn blanked(text: &str) -> String {
    let bytes = text.as_bytes();
    let mut code = bytes.to_vec();
    let mut at = 0;
    let blank = |code: &mut Vec<u8>, from: usize, to: usize| {
        for byte in &mut code[from..to] {
            if *byte != b'\n' {
                *byte = b' ';
            }
        }
    };
    while at < bytes.len() {
        let rest = &bytes[at..];
        if rest.starts_with(b"//") {
            let end = rest.iter().position(|byte| *byte == b'\n').map_or(bytes.len(), |length| at + length);
            blank(&mut code, at, end);
            at = end;
        } else if rest.starts_with(b"/*") {
            let end = text[at..].find("*/").map_or(bytes.len(), |length| at + length + 2);
            blank(&mut code, at, end);
            at = end;
        } else if let Some((open, close)) = raw_text(rest) {
            let end = text[at + open..].find(&close).map_or(bytes.len(), |length| at + open + length);
            blank(&mut code, at + open, end);
            at = end + close.len();
        } else if rest[0] == b'"' {
            let mut end = at + 1;
            while end < bytes.len() && bytes[end] != b'"' {
                end += if bytes[end] == b'\\' { 2 } else { 1 };
            }
            let end = end.min(bytes.len());
            blank(&mut code, at + 1, end);
            at = end + 1;
        } else if rest[0] == b'\'' {
            // A character has its closing quote near; a lifetime has none.
            let end = if rest.get(1) == Some(&b'\\') {
                rest[2..].iter().skip(1).position(|byte| *byte == b'\'').map(|length| at + 3 + length)
            } else {
                let width = text[at + 1..].chars().next().map_or(1, char::len_utf8);
                (rest.get(1 + width) == Some(&b'\'')).then_some(at + 1 + width)
            };
            match end {
                Some(end) => {
                    blank(&mut code, at + 1, end);
                    at = end + 1;
                }
                None => at += 1,
            }
        } else {
            at += 1;
        }
    }
    String::from_utf8(code).unwrap()
}

/// Length of the opening of a raw text, and its closing.
fn raw_text(rest: &[u8]) -> Option<(usize, String)> {
    let behind = rest.strip_prefix(b"r")?;
    let hashes = behind.iter().take_while(|byte| **byte == b'#').count();
    (behind.get(hashes) == Some(&b'"')).then(|| (hashes + 2, format!("\"{}", "#".repeat(hashes))))
}

/// Paths in the code that begin with `start`, groups expanded: `crate::{a::b, c}` is `a::b` and `c`. Each
/// with its byte position.
fn paths(code: &str, start: &str) -> Vec<(usize, String)> {
    let mut found = Vec::new();
    for (at, _) in code.match_indices(start) {
        let before = code[..at].chars().next_back();
        if before.is_some_and(|letter| letter.is_alphanumeric() || letter == '_' || letter == ':') {
            continue;
        }
        let behind = &code[at + start.len()..];
        if behind.starts_with('{') {
            let mut depth = 0_usize;
            let mut name = String::new();
            for letter in behind.chars() {
                match letter {
                    '{' => depth += 1,
                    '}' => depth -= 1,
                    _ => {}
                }
                if depth == 0 || (depth == 1 && letter == ',') {
                    found.push((at, name.trim().to_owned()));
                    name.clear();
                } else if depth > 1 || letter != '{' {
                    name.push(letter);
                }
                if depth == 0 {
                    break;
                }
            }
        } else {
            let end =
                behind.find(|letter: char| !(letter.is_alphanumeric() || letter == '_' || letter == ':'));
            found.push((at, behind[..end.unwrap_or(behind.len())].to_owned()));
        }
    }
    found.retain(|(_, name)| !name.is_empty());
    found
}

fn first(path: &str) -> &str {
    path.split("::").next().unwrap_or(path).split_whitespace().next().unwrap_or("")
}

/// Depth of modules opened in the file itself (`mod tests {`) that enclose a position.
fn inline_depth(code: &str, at: usize) -> usize {
    let mut depth = 0;
    let mut from = 0;
    while let Some(found) = code[from..at].find("mod ") {
        let start = from + found;
        from = start + 4;
        let Some(brace) = code[from..].find(['{', ';']).map(|offset| from + offset) else { break };
        if code.as_bytes()[brace] == b';' || brace > at {
            continue;
        }
        let open: isize = code[brace..at]
            .chars()
            .map(|letter| match letter {
                '{' => 1,
                '}' => -1,
                _ => 0,
            })
            .sum();
        depth += usize::from(open > 0);
    }
    depth
}

/// Everything wrong with the imports of one file of the library.
fn import_faults(source: &Source) -> Vec<String> {
    let top = source.top();
    let allowed = MAY_USE.iter().find(|(module, _)| *module == top).map(|(_, allowed)| *allowed);
    let Some(allowed) = allowed else { return vec![format!("{}: module not in the table", source.path)] };
    let mut faults = Vec::new();
    let mut say = |at: usize, message: String| {
        faults.push(format!("{}:{}: {message}", source.path, source.line_at(at)));
    };
    let may = |module: &str| module == top || allowed.contains(&module);
    for (at, path) in paths(&source.code, "crate::") {
        if !may(first(&path)) {
            say(at, format!("`{top}` may not use `{}`", first(&path)));
        }
    }
    for (at, _) in paths(&source.code, "weldpole::") {
        say(at, "the library names itself `crate`".to_owned());
    }
    let depth = source.module().len();
    let mut from = 0;
    while let Some(found) = source.code[from..].find("super::") {
        let at = from + found;
        let chain = source.code[at..].split("super::").take_while(|part| part.is_empty()).count();
        let rest = &source.code[at + 7 * chain..];
        from = at + 7 * chain;
        // Upward steps out of the module itself land in the crate's root, where only allowed names may follow.
        let levels = depth + inline_depth(&source.code, at);
        if chain > levels {
            say(at, "too many `super::`".to_owned());
        } else if chain == levels {
            let targets = paths(&format!("crate::{rest}"), "crate::");
            for (_, path) in targets.into_iter().take_while(|(position, _)| *position == 0) {
                if !may(first(&path)) {
                    say(at, format!("`super::` leads from `{top}` to `{}`", first(&path)));
                }
            }
        }
    }
    faults
}

/// Imports of the binary: its own modules and the public library, never the library's sources.
fn command_line_faults(source: &Source) -> Vec<String> {
    let mut faults = Vec::new();
    for (at, path) in paths(&source.code, "crate::") {
        if first(&path) != "cli" {
            faults.push(format!("{}:{}: `crate::{path}`", source.path, source.line_at(at)));
        }
    }
    for (at, _) in source.code.match_indices("#[path") {
        faults.push(format!("{}:{}: `#[path]`", source.path, source.line_at(at)));
    }
    faults
}

fn outside_world_faults(source: &Source) -> Vec<String> {
    let mut faults = Vec::new();
    for name in OUTSIDE_WORLD {
        for (at, _) in source.code.match_indices(name) {
            let before = source.code[..at].chars().next_back();
            let behind = source.code[at + name.len()..].chars().next();
            let joined = |letter: Option<char>| letter.is_some_and(|l| l.is_alphanumeric() || l == '_');
            if !joined(before) && (name.ends_with('!') || !joined(behind)) {
                faults.push(format!("{}:{}: `{name}`", source.path, source.line_at(at)));
            }
        }
    }
    for (at, path) in paths(&source.code, "std::") {
        if source.code[at..].starts_with("std::{")
            && ["fs", "env", "io", "process", "net"].contains(&first(&path))
        {
            faults.push(format!("{}:{}: `std::{path}`", source.path, source.line_at(at)));
        }
    }
    faults
}

/// Ways to fail outside test code, and `expect` without a proof.
fn panic_faults(source: &Source) -> Vec<String> {
    let end = source.tests_begin();
    let code = &source.code[..end];
    let mut faults = Vec::new();
    for name in NEVER {
        for (at, _) in code.match_indices(name) {
            faults.push(format!("{}:{}: `{name}`", source.path, source.line_at(at)));
        }
    }
    for (at, _) in code.match_indices(".expect(") {
        let argument = source.text[at + ".expect(".len()..].trim_start();
        let proof = match argument.strip_prefix('"') {
            Some(text) => text.find('"').is_some_and(|length| length >= SHORTEST_PROOF),
            None => argument.starts_with("PROOF"),
        };
        if !proof {
            faults.push(format!("{}:{}: `expect` without a proof", source.path, source.line_at(at)));
        }
    }
    faults
}

fn form_faults(source: &Source) -> Vec<String> {
    let mut faults = Vec::new();
    if !source.text.starts_with("//!") {
        faults.push(format!("{}: does not open by saying what it is for", source.path));
    }
    let lines = source.text.lines().count();
    if lines > MOST_LINES {
        faults.push(format!("{}: {lines} lines, at most {MOST_LINES}", source.path));
    }
    faults
}

fn sources() -> Vec<Source> {
    let root = Path::new(env!("CARGO_MANIFEST_DIR")).join("src");
    let mut folders = vec![root.clone()];
    let mut files: Vec<PathBuf> = Vec::new();
    while let Some(folder) = folders.pop() {
        for entry in fs::read_dir(folder).unwrap() {
            let path = entry.unwrap().path();
            if path.is_dir() {
                folders.push(path);
            } else if path.extension().is_some_and(|extension| extension == "rs") {
                files.push(path);
            }
        }
    }
    files.sort();
    assert!(files.len() > 50, "found {}", files.len());
    let read = |path: PathBuf| {
        let parts: Vec<String> = path
            .strip_prefix(&root)
            .unwrap()
            .components()
            .map(|part| part.as_os_str().to_str().unwrap().to_owned())
            .collect();
        Source::new(&parts.join("/"), &fs::read_to_string(&path).unwrap())
    };
    files.into_iter().map(read).collect()
}

fn none(faults: &[String]) {
    assert!(faults.is_empty(), "{}", faults.join("\n"));
}

fn of(check: impl Fn(&Source) -> Vec<String>, which: impl Fn(&Source) -> bool) -> Vec<String> {
    sources().iter().filter(|source| which(source)).flat_map(check).collect()
}

fn library(source: &Source) -> bool {
    !source.is_command_line()
}

#[test]
fn modules_import_only_what_the_table_allows() {
    none(&of(import_faults, library));
}

#[test]
fn the_command_line_sees_only_the_public_library() {
    none(&of(command_line_faults, Source::is_command_line));
}

#[test]
fn the_library_touches_neither_files_nor_terminal_nor_clock() {
    none(&of(outside_world_faults, library));
}

#[test]
fn nothing_fails_without_a_proof_that_it_cannot() {
    none(&of(panic_faults, |_| true));
}

#[test]
fn every_file_says_what_it_is_for_and_stays_short() {
    none(&of(form_faults, |_| true));
}

/// The table has one row for each module of `lib.rs`, and DEVELOPERS.md shows the same table.
#[test]
fn the_table_is_complete_and_documented() {
    let sources = sources();
    let root = sources.iter().find(|source| source.path == "lib.rs").unwrap();
    let declared: Vec<&str> = root.code.lines().filter_map(|line| line.strip_prefix("pub mod ")).collect();
    assert!(declared.len() >= 10, "{declared:?}");
    for module in declared {
        let module = module.trim_end_matches(';');
        assert!(MAY_USE.iter().any(|(name, _)| *name == module), "{module}");
    }
    let guide = fs::read_to_string(Path::new(env!("CARGO_MANIFEST_DIR")).join("DEVELOPERS.md")).unwrap();
    for (module, allowed) in MAY_USE.iter().filter(|(module, _)| *module != "lib") {
        let list = if allowed.is_empty() { "nothing of ours".to_owned() } else { allowed.join(", ") };
        let row = format!("| `{module}` | {list} |");
        assert!(guide.contains(&row), "DEVELOPERS.md lacks the row: {row}");
    }
}

#[test]
fn the_checker_finds_planted_imports() {
    let faults = |path: &str, text: &str| import_faults(&Source::new(path, text)).len();
    assert_eq!(faults("units.rs", "use crate::model::Weld;"), 1);
    assert_eq!(faults("verify/check.rs", "use crate::{model::Weld, mechanics::{Cell, Law}, output};"), 2);
    assert_eq!(faults("solvers/path.rs", "fn f() { let x = crate::analysis::analyse(); }"), 1);
    assert_eq!(faults("model/weld.rs", "use super::super::output::text;"), 1);
    assert_eq!(faults("model/weld.rs", "use super::super::{units::Dimension, input::read_joint};"), 1);
    assert_eq!(faults("model/weld.rs", "mod tests { use super::super::super::solvers::elastic; }"), 1);
    assert_eq!(faults("model/mod.rs", "use super::verify::Check;"), 1);
    assert_eq!(faults("units.rs", "use super::model::Weld;"), 1);
    assert_eq!(faults("input/mod.rs", "pub use crate::cli::run;"), 1);
    assert_eq!(faults("output/csv/mod.rs", "use weldpole::mechanics::Cell;"), 1);
    assert_eq!(faults("attic/sweep.rs", "fn f() {}"), 1, "a new module must enter the table");
    for (path, text) in [
        ("model/weld.rs", "use super::group; use crate::units::Dimension;"),
        ("input/check/law.rs", "use super::super::faults::Faults; pub(in crate::input) fn f() {}"),
        ("units.rs", "mod tests { use super::*; }"),
        ("units.rs", "// use crate::model::Weld;\nconst TEXT: &str = \"crate::model\";"),
        ("model/mod.rs", "const TEXT: &str = r#\"say \"crate::output\" \"#; /* crate::output */"),
    ] {
        assert_eq!(faults(path, text), 0, "{path}: {text}");
    }
    let binary = |text: &str| command_line_faults(&Source::new("cli/check.rs", text)).len();
    assert_eq!(binary("use crate::input::read_joint;"), 1);
    assert_eq!(binary("#[path = \"../input/mod.rs\"] mod input;"), 1);
    assert_eq!(binary("use weldpole::input::read_joint; use crate::cli::exit::Exit;"), 0);
}

#[test]
fn the_checker_finds_planted_calls() {
    let outside = |text: &str| outside_world_faults(&Source::new("model/weld.rs", text)).len();
    for text in [
        "fn f() { println!(\"x\"); }",
        "fn f() { eprint!(\"x\"); }",
        "use std::fs;",
        "use std::{fmt, env};",
        "let now = std::time::Instant::now();",
        "use std::time::SystemTime;",
    ] {
        assert_eq!(outside(text), 1, "{text}");
    }
    for text in ["struct InstantaneousCentre;", "// println!(\"x\")", "use std::{fmt, ops::Range};"] {
        assert_eq!(outside(text), 0, "{text}");
    }
    let panics = |text: &str| panic_faults(&Source::new("model/weld.rs", text)).len();
    for text in [
        "fn f() { x.unwrap(); }",
        "fn f() { x.expect(\"a weld\"); }",
        "fn f() { panic!(\"x\"); }",
        "fn f() { todo!() }",
        "#[cfg(test)]\nmod fixture;\nfn f() { x.unwrap(); }",
    ] {
        assert_eq!(panics(text), 1, "{text}");
    }
    for text in [
        "fn f() { x.expect(\"memory accepts every write without a fault\"); }",
        "fn f() { x.expect(PROOF); }",
        "fn f() { x.unwrap_or(0.0); }",
        "fn f() {}\n#[cfg(test)]\nmod tests { fn g() { x.unwrap(); } }",
    ] {
        assert_eq!(panics(text), 0, "{text}");
    }
    let form = |text: &str| form_faults(&Source::new("model/weld.rs", text)).len();
    assert_eq!(form("use std::fmt;"), 1);
    assert_eq!(form(&format!("//! A file.\n{}", "\n".repeat(500))), 1);
    assert_eq!(form("//! A file."), 0);
}
