//! The self-check as a user meets it: the page, the table, the document.

use super::Desk;

#[test]
fn every_published_value_is_met_and_the_page_says_so_first() {
    let outcome = Desk::new("selfcheck").run(&["selfcheck"]).ends_with(0);
    let text = &outcome.stdout;
    assert!(text.starts_with("PASSED      all 159 published values are met"), "{text}");
    assert!(text.contains(concat!("Program   weldpole ", env!("CARGO_PKG_VERSION"))), "{text}");
    for said in ["not with physical tests", "licensed engineer", "lesik-kennedy", "Bhandari", "p. 8-164"] {
        assert!(text.contains(said), "{said}");
    }
    assert!(!text.contains("failed") && !text.contains("Failures"), "{text}");
    assert!(outcome.stderr.is_empty(), "{}", outcome.stderr);
}

#[test]
fn the_page_keeps_to_the_width_asked_for_and_names_rows_where_there_is_room() {
    let desk = Desk::new("selfcheck-width");
    for width in [72, 80, 120] {
        let text = desk.run(&["selfcheck", "--width", &width.to_string()]).ends_with(0).stdout;
        assert!(text.lines().all(|line| line.chars().count() <= width), "{width}");
        assert_eq!(text.contains("T8-38m_k0.4_a0.15"), width >= 100, "{width}");
    }
}

#[test]
fn the_table_has_one_row_for_each_value_with_its_source() {
    let text = Desk::new("selfcheck-csv").run(&["selfcheck", "--format", "csv"]).ends_with(0).stdout;
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let titles = reader.headers().unwrap().clone();
    let rows: Vec<csv::StringRecord> = reader.records().map(Result::unwrap).collect();
    let column = |title: &str| titles.iter().position(|name| name == title).unwrap();
    assert_eq!(rows.len(), 159);
    for row in &rows {
        assert_eq!(&row[column("verdict")], "passed", "{row:?}");
        assert!(!row[column("source")].is_empty() && !row[column("why")].is_empty(), "{row:?}");
        let number = |title: &str| row[column(title)].parse::<f64>().unwrap();
        // Twelve digits each.
        let ratio = number("computed") / number("expected");
        assert!((number("ratio") / ratio - 1.0).abs() < 1e-10, "{row:?}");
        // Judged again from the table alone.
        let digits = row[column("expected")].split_once('.').map_or(0, |(_, digits)| digits.len());
        let allowed = match &row[column("tolerance_kind")] {
            "relative" => number("tolerance") * number("expected"),
            kind => {
                assert_eq!(kind, "last-digit");
                number("tolerance") * 0.1_f64.powi(digits as i32)
            }
        };
        assert!((number("computed") - number("expected")).abs() <= allowed, "{row:?}");
    }
}

#[test]
fn the_document_counts_and_names_what_was_used() {
    let desk = Desk::new("selfcheck-json");
    desk.run(&["selfcheck", "--format", "json", "-o", "check.json"]).ends_with(0);
    let json: serde_json::Value = serde_json::from_str(&desk.read("check.json")).unwrap();
    assert_eq!(json["schema"], "weldpole.selfcheck/1");
    assert_eq!(json["version"], env!("CARGO_PKG_VERSION"));
    assert_eq!((&json["verdict"], &json["law"]), (&"passed".into(), &"lesik-kennedy".into()));
    assert_eq!(json["counts"], serde_json::json!({ "cases": 159, "passed": 159, "failed": 0 }));
    let cases = json["cases"].as_array().unwrap();
    assert_eq!(cases.len(), 159);
    assert!(cases.iter().all(|case| case["computed"].is_number() && case["reason"].is_null()));
}

#[test]
fn the_same_bytes_come_out_each_time_and_any_count_of_threads_gives_them() {
    let desk = Desk::new("selfcheck-repeat");
    let with_threads = |count: &str| {
        let mut command = desk.command(&["selfcheck", "--format", "json"]);
        command.env("RAYON_NUM_THREADS", count).output().unwrap().stdout
    };
    let one = with_threads("1");
    assert!(!one.is_empty() && one == with_threads("3"));
}

#[test]
fn a_page_that_cannot_be_written_is_no_answer() {
    let outcome = Desk::new("selfcheck-nowhere").run(&["selfcheck", "-o", "no/such/page.txt"]).ends_with(2);
    assert!(outcome.stderr.contains("its directory does not exist"), "{}", outcome.stderr);
}
