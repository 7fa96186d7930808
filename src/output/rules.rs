//! Rule sets and laws as text and JSON: what is available, what it accepts, and how far it is confirmed.

use super::json::pretty;
use super::layout::{Emphasis, Layout};
use super::names::{basis_name, confirmation_name};
use super::number::rounded;
use super::table::{Side, Table, hanging, labelled};
use crate::model::{Confirmation, DesignFactor, Law, LawForm, RuleSet};
use serde::Serialize;

/// The list of rule sets and laws.
#[must_use]
pub fn rules_text(sets: &[RuleSet], laws: &[Law], layout: &Layout) -> String {
    let mut text = (layout.paint)(Emphasis::Heading, "Rule sets") + "\n";
    let mut table = Table::new(&[
        ("id", Side::Left),
        ("edition", Side::Flexible),
        ("accepts", Side::Flexible),
        ("values", Side::Left),
    ]);
    for set in sets {
        let edition = set.edition.as_str().into();
        table.row(vec![
            set.id.as_str().into(),
            edition,
            accepted(set).join(", ").into(),
            confirmation_name(set.status()).into(),
        ]);
    }
    text.push_str(&table.render(2, layout));
    text.push('\n');
    text.push_str(&(layout.paint)(Emphasis::Heading, "Load-deformation laws"));
    text.push('\n');
    let mut table = Table::new(&[("id", Side::Left), ("title", Side::Flexible), ("values", Side::Left)]);
    for law in laws {
        table.row(vec![
            law.id.as_str().into(),
            law.title.as_str().into(),
            confirmation_name(law.status).into(),
        ]);
    }
    text.push_str(&table.render(2, layout));
    text.push('\n');
    let legend = "Values are `read` when all of them were checked against the published text, `recalled` when \
                  some were not: confirm those before you rest a design on them. `weldpole rules ID` shows one \
                  rule set with every number and its clause, or one law with its source.";
    text + &hanging("", legend, layout.columns())
}

/// One rule set with every number, its clause, source and confirmation.
#[must_use]
pub fn rule_set_text(set: &RuleSet, layout: &Layout) -> String {
    let mut text = hanging(&format!("{}  ", set.id), &set.title, layout.columns());
    let mut rows = vec![
        ("edition", set.edition.clone()),
        ("accepts", accepted(set).join(", ")),
        ("default law", set.law.clone()),
        ("counts with", set.ultimate_laws.join(", ")),
        ("ultimate", set.ultimate_clause.clone()),
        ("elastic", set.elastic_clause.clone()),
        ("design", design(&set.design)),
    ];
    rows.retain(|(_, value)| !value.is_empty());
    text.push_str(&labelled(2, &rows, layout.columns()));
    text.push('\n');
    text.push_str(&(layout.paint)(Emphasis::Heading, "Numbers"));
    text.push('\n');
    for (name, number) in set.numbers() {
        text.push_str(&hanging("  ", &format!("{name} = {}", number.value), layout.columns()));
        let detail = format!("{}; {}; {}", number.clause, confirmation_name(number.status), number.source);
        text.push_str(&hanging("      ", &detail, layout.columns()));
    }
    if !set.remarks.is_empty() {
        text.push('\n');
        text.push_str(&(layout.paint)(Emphasis::Heading, "Remarks"));
        text.push('\n');
        for remark in &set.remarks {
            text.push_str(&hanging("  - ", remark, layout.columns()));
        }
    }
    text
}

/// One law with its form, source and confirmation.
#[must_use]
pub fn law_text(law: &Law, layout: &Layout) -> String {
    let title = hanging(&format!("{}  ", law.id), &law.title, layout.columns());
    let rows = [
        ("form", form(&law.form).to_owned()),
        ("source", law.source.clone()),
        ("values", confirmation_name(law.status).to_owned()),
    ];
    title + &labelled(2, &rows, layout.columns())
}

fn accepted(set: &RuleSet) -> Vec<&'static str> {
    set.accepts.iter().map(|basis| basis_name(*basis)).collect()
}

fn design(factor: &DesignFactor) -> String {
    match factor {
        DesignFactor::None => "nominal strength used as it is".to_owned(),
        DesignFactor::Resistance(phi) => format!("nominal strength times phi = {}", phi.value),
        DesignFactor::Safety(omega) => format!("nominal strength over Omega = {}", omega.value),
    }
}

fn form(form: &LawForm) -> &'static str {
    match form {
        LawForm::LesikKennedy { .. } => {
            "directional strength times a curve in deformation over deformation at greatest strength"
        }
        LawForm::ButlerPalKulak { .. } => "exponential curve whose strength and shape depend on the angle",
        LawForm::RigidPlastic { .. } => "full directional strength at any deformation, no rupture",
        LawForm::Table(_) => "a table of points at one or more angles",
    }
}

#[derive(Serialize)]
struct RulesJson<'a> {
    schema: &'static str,
    version: &'a str,
    rules: Vec<RuleSetJson<'a>>,
    laws: Vec<LawJson<'a>>,
}

#[derive(Serialize)]
struct RuleSetJson<'a> {
    id: &'a str,
    title: &'a str,
    edition: &'a str,
    values: &'static str,
    accepts: Vec<&'static str>,
    law: &'a str,
    ultimate_clause: &'a str,
    elastic_clause: &'a str,
    design_multiplier: f64,
    numbers: Vec<NumberJson<'a>>,
    remarks: &'a [String],
}

#[derive(Serialize)]
struct NumberJson<'a> {
    name: &'static str,
    value: f64,
    clause: &'a str,
    source: &'a str,
    values: &'static str,
}

#[derive(Serialize)]
struct LawJson<'a> {
    id: &'a str,
    title: &'a str,
    source: &'a str,
    values: &'static str,
}

/// Rule sets and laws as JSON, schema `weldpole.rules/1`.
#[must_use]
pub fn rules_json(version: &str, sets: &[RuleSet], laws: &[Law]) -> String {
    let values = |status: Confirmation| confirmation_name(status);
    let rules = sets
        .iter()
        .map(|set| RuleSetJson {
            id: &set.id,
            title: &set.title,
            edition: &set.edition,
            values: values(set.status()),
            accepts: accepted(set),
            law: &set.law,
            ultimate_clause: &set.ultimate_clause,
            elastic_clause: &set.elastic_clause,
            design_multiplier: rounded(set.design.multiplier()),
            numbers: set
                .numbers()
                .into_iter()
                .map(|(name, number)| NumberJson {
                    name,
                    value: rounded(number.value),
                    clause: &number.clause,
                    source: &number.source,
                    values: values(number.status),
                })
                .collect(),
            remarks: &set.remarks,
        })
        .collect();
    let laws = laws
        .iter()
        .map(|law| LawJson {
            id: &law.id,
            title: &law.title,
            source: &law.source,
            values: values(law.status),
        })
        .collect();
    pretty(&RulesJson { schema: "weldpole.rules/1", version, rules, laws })
}

#[cfg(test)]
mod tests {
    use super::super::fixture;
    use super::*;

    #[test]
    fn the_list_shows_what_is_accepted_and_how_far_values_are_confirmed() {
        insta::assert_snapshot!(rules_text(&[fixture::rules()], &[fixture::law()], &Layout::default()));
    }

    #[test]
    fn one_rule_set_shows_every_number_with_its_clause() {
        insta::assert_snapshot!(rule_set_text(&fixture::rules(), &Layout::default()));
    }

    #[test]
    fn a_law_names_its_source() {
        let text = law_text(&fixture::law(), &Layout::default());
        assert!(text.contains("nobody, nowhere") && text.contains("recalled"), "{text}");
    }

    #[test]
    fn the_json_lists_both() {
        let text = rules_json("0.0.0", &[fixture::rules()], &[fixture::law()]);
        let json: serde_json::Value = serde_json::from_str(&text).unwrap();
        assert_eq!(json["schema"], "weldpole.rules/1");
        assert_eq!(json["rules"][0]["design_multiplier"], 0.75);
        assert_eq!(json["rules"][0]["numbers"][1]["values"], "recalled");
        assert_eq!(json["laws"][0]["id"], "made-up-law");
    }
}
