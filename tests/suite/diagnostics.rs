//! Faults of joint files: the exact wording of every family, and no panic on any text.
//!
//! Each `tests/bad_inputs/NAME.toml` has its diagnostics, one a line, in `NAME.expected`. With
//! `UPDATE_EXPECTED=1` the expected files are rewritten: read the difference before committing it.

use proptest::prelude::*;
use std::path::{Path, PathBuf};
use weldpole::input::{Options, catalog, read_joint};

fn folder() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/bad_inputs")
}

fn messages(name: &str, text: &str) -> String {
    match read_joint(name, text, &Options::default()) {
        Ok(_) => String::new(),
        Err(faults) => faults.iter().map(|fault| format!("{fault}\n")).collect(),
    }
}

#[test]
fn bad_inputs_are_told_as_expected() {
    let update = std::env::var_os("UPDATE_EXPECTED").is_some();
    let mut files: Vec<PathBuf> =
        std::fs::read_dir(folder()).unwrap().map(|entry| entry.unwrap().path()).collect();
    files.retain(|path| path.extension().is_some_and(|extension| extension == "toml"));
    files.sort();
    assert!(files.len() >= 20, "found {}", files.len());
    let mut differences = String::new();
    for path in files {
        let name = path.file_name().unwrap().to_str().unwrap().to_owned();
        let found = messages(&name, &std::fs::read_to_string(&path).unwrap());
        assert!(!found.is_empty(), "{name} has no fault");
        let expected_path = path.with_extension("expected");
        if update {
            std::fs::write(&expected_path, &found).unwrap();
        }
        let expected = std::fs::read_to_string(&expected_path).unwrap_or_default();
        if found != expected {
            differences.push_str(&format!("{name}\nfound:\n{found}expected:\n{expected}\n"));
        }
    }
    assert!(differences.is_empty(), "{differences}");
}

#[test]
fn every_fault_has_a_usable_place() {
    for entry in std::fs::read_dir(folder()).unwrap() {
        let path = entry.unwrap().path();
        if path.extension().is_none_or(|extension| extension != "toml") {
            continue;
        }
        let text = std::fs::read_to_string(&path).unwrap();
        for fault in read_joint("f", &text, &Options::default()).unwrap_err() {
            assert!(fault.message.starts_with(|letter: char| !letter.is_uppercase()), "{fault}");
            let Some(place) = fault.place else { continue };
            assert!(text.get(place.span.clone()).is_some(), "{:?}", place.span);
            let before = &text[..place.span.start];
            assert_eq!(place.line, before.matches('\n').count() + 1);
        }
    }
}

#[test]
fn strange_files_are_faults() {
    for text in
        ["", "\n\n", "\u{feff}", "\u{0}", "\u{1b}[31m", "units", "= 3", "[", "[[weld]]\n[[weld", "\"\"\""]
    {
        assert!(!messages("f", text).is_empty(), "{text:?}");
    }
    for deep in ["[", "{a=", "-", "("] {
        let text = format!("elements = {}", deep.repeat(50_000));
        assert!(!messages("f", &text).is_empty());
        let text = format!("elements = \"{}\"", deep.repeat(50_000));
        assert!(!messages("f", &text).is_empty());
    }
}

#[test]
fn a_file_of_many_faults_is_read_in_reasonable_time() {
    let text = "strange = 1\n".repeat(20_000);
    assert!(!messages("f", &text).is_empty());
    let one_line = format!("a = [{}]", "[1,2],".repeat(50_000));
    assert!(!messages("f", &one_line).is_empty());
}

fn check_any(text: &str) {
    match read_joint("f", text, &Options::default()) {
        Ok(joint) => {
            assert!(!joint.cases.is_empty() || joint.combined);
            for case in &joint.cases {
                assert!(case.wrench.force.iter().chain(case.wrench.moment.iter()).all(|c| c.is_finite()));
            }
        }
        Err(faults) => assert!(!faults.is_empty()),
    }
}

#[derive(Debug, Clone)]
enum Edit {
    Delete(prop::sample::Index, usize),
    Duplicate(prop::sample::Index, usize),
    Replace(prop::sample::Index, u8),
    Insert(prop::sample::Index, &'static str),
}

fn edits() -> impl Strategy<Value = Edit> {
    let pieces = prop::sample::select(vec![
        "\n",
        "[",
        "]",
        "{",
        "}",
        "\"",
        "'",
        "=",
        ".",
        ",",
        "#",
        "1e308",
        "-",
        "inf",
        "nan",
        "\"\"\"",
        "\u{0}",
        "é",
        "[[weld]]\n",
        "leg = 3\n",
        "^",
        "(",
        "0x",
        "1979-05-27",
        " in",
        "true",
    ]);
    prop_oneof![
        (any::<prop::sample::Index>(), 1..40_usize).prop_map(|(at, size)| Edit::Delete(at, size)),
        (any::<prop::sample::Index>(), 1..80_usize).prop_map(|(at, size)| Edit::Duplicate(at, size)),
        (any::<prop::sample::Index>(), any::<u8>()).prop_map(|(at, byte)| Edit::Replace(at, byte)),
        (any::<prop::sample::Index>(), pieces).prop_map(|(at, piece)| Edit::Insert(at, piece)),
    ]
}

fn edited(text: &str, edits: &[Edit]) -> String {
    let mut bytes = text.as_bytes().to_vec();
    for edit in edits {
        if bytes.is_empty() {
            break;
        }
        match edit {
            Edit::Delete(at, size) => {
                let start = at.index(bytes.len());
                let end = (start + size).min(bytes.len());
                bytes.drain(start..end);
            }
            Edit::Duplicate(at, size) => {
                let start = at.index(bytes.len());
                let end = (start + size).min(bytes.len());
                let piece = bytes[start..end].to_vec();
                bytes.splice(start..start, piece);
            }
            Edit::Replace(at, byte) => {
                let start = at.index(bytes.len());
                bytes[start] = *byte;
            }
            Edit::Insert(at, piece) => {
                let start = at.index(bytes.len());
                bytes.splice(start..start, piece.bytes());
            }
        }
    }
    String::from_utf8_lossy(&bytes).into_owned()
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 400, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn any_text_is_read_or_refused(text in "\\PC{0,200}") {
        check_any(&text);
        check_any(&format!("units = \"us\"\nelements = \"{text}\"\n"));
    }

    #[test]
    fn any_expression_is_read_or_refused(text in "[0-9a-z.+*/^(), -]{0,60}") {
        check_any(&catalog::DEMO.replace("\"90 mm\"", &format!("'{text}'")));
    }

    #[test]
    fn a_damaged_file_is_read_or_refused(
        edits in prop::collection::vec(edits(), 1..6),
        which in 0..6_usize,
    ) {
        let mut texts = vec![catalog::DEMO, catalog::STARTER];
        texts.extend(catalog::EXAMPLES.iter().map(|(_, text)| *text));
        check_any(&edited(texts[which], &edits));
    }

    #[test]
    fn any_order_of_headers_is_read_or_refused(
        lines in prop::collection::vec(prop::sample::select(vec![
            "[weld]", "[[weld]]", "[weld.arc]", "[[weld.arc]]", "weld.arc.radius = 3", "weld = []", "weld = [{}]",
            "weld = {}", "arc.radius = 4", "arc = {}", "[law]", "[[law.curve]]", "[law.curve]", "law.curve = [1]",
            "law = 'a'", "[parameters]", "b = 'b'", "b.c = 1", "[parameters.b]", "[\"\"]", "'' = 1", "[a", "= 1",
            "[[load]]", "force.size = 1", "force = [0, 1]", "at = [0, 0]", "case = 'x'", "[[combination]]",
            "factors.x = 1", "[combination.factors]", "units = 'us'", "rules = 'nominal'", "name = 'n'",
        ]), 0..16),
    ) {
        check_any(&lines.join("\n"));
    }
}
