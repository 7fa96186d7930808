//! One case in detail: the load, the two methods side by side, the states found, the checks.

use crate::analysis::{Analyses, CaseReport, Coefficients, Status};
use crate::model::{Basis, Joint, Vector};
use crate::output::layout::{Emphasis, Layout};
use crate::output::methods::Methods;
use crate::output::number::{MISSING, degrees, measure, people, point, quantity, small, utilisation};
use crate::output::table::{Cell, Side, Table, clip, hanging, labelled};
use crate::output::words;
use crate::solvers::{Place, Ultimate};
use crate::units::{Dimension, UnitSystem};

/// Columns given to each of the two methods.
const METHOD_WIDTH: usize = 25;

/// The text of one case.
pub(super) fn text(case: &CaseReport, joint: &Joint, layout: &Layout) -> String {
    let heading = clip(&format!("Case {}", case.name), layout.columns());
    let mut block = (layout.paint)(Emphasis::Heading, &heading) + "\n";
    if matches!(case.analyses, Analyses::Unloaded) {
        return block + &hanging("  ", "No load: nothing to resist, utilisation 0.", layout.columns());
    }
    block.push_str(&load(case, joint.units, layout));
    block.push('\n');
    block.push_str(&methods(case, joint, layout));
    block.push('\n');
    block.push_str(&remarks(case, joint, layout));
    if !case.checks.is_empty() {
        block.push('\n');
        block.push_str(&checks(case, joint.units, layout));
    }
    block
}

fn load(case: &CaseReport, units: UnitSystem, layout: &Layout) -> String {
    let moment = case.load.moment;
    let moment = if moment.x == 0.0 && moment.y == 0.0 {
        quantity(units, Dimension::Moment, moment.z)
    } else {
        point(units, Dimension::Moment, moment.as_slice())
    };
    // Where the measure is a moment, a force is what rounding leaves of loads that cancel.
    let in_moment = case.load_times(1.0).is_some_and(|(_, in_moment)| in_moment);
    let force = if in_moment { Vector::zeros() } else { case.load.force };
    let force = point(units, Dimension::Force, force.as_slice());
    let text = format!("force {force}, moment about the centroid {moment}");
    labelled(2, &[("Load", text)], layout.columns())
}

/// The two methods side by side.
fn methods(case: &CaseReport, joint: &Joint, layout: &Layout) -> String {
    let units = joint.units;
    let methods = Methods::of(case, joint);
    let mut table = Table::new(&[("", Side::Flexible), ("ultimate", Side::Right), ("elastic", Side::Right)]);
    let mut row = |label: &str, left: String, right: String| {
        table.row(vec![label.into(), clip(&left, METHOD_WIDTH).into(), clip(&right, METHOD_WIDTH).into()]);
    };
    row("method", words::basis(Basis::Ultimate).into(), words::basis(Basis::Elastic).into());
    for (label, [left, right]) in [
        ("under these rules", methods.standing),
        ("nominal strength", methods.nominal),
        ("design strength", methods.design),
        ("load factor, nominal", methods.nominal_factor),
        ("load factor, design", methods.design_factor),
        ("utilisation", methods.utilisation),
    ] {
        row(label, left, right);
    }
    let state = case.ultimate().map(Ultimate::governing);
    let centre = state.map_or_else(
        || MISSING.to_owned(),
        |state| {
            let shown = |centre: [f64; 2]| point(units, Dimension::Length, &centre);
            state.centre.map_or_else(|| "translation (no centre)".to_owned(), shown)
        },
    );
    row("centre of rotation", centre, MISSING.into());
    let rupture = state.and_then(|state| state.critical.as_ref());
    let peak = case.elastic().map(|elastic| elastic.critical);
    let (left, right) = (rupture.map(|rupture| rupture.place), peak.map(|peak| peak.place));
    row("critical weld", weld_name(left, joint), weld_name(right, joint));
    row("critical point", coordinates(left, units), coordinates(right, units));
    let angle = rupture.map(|rupture| degrees(rupture.angle));
    row("angle to the weld axis", angle.unwrap_or_else(|| MISSING.into()), MISSING.into());
    let deformation = rupture.map(|rupture| {
        let shown = people(units.shown(Dimension::Length, rupture.deformation));
        format!("{shown} / {}", quantity(units, Dimension::Length, rupture.limit))
    });
    row("deformation / limit", deformation.unwrap_or_else(|| MISSING.into()), MISSING.into());
    let line = peak.map(|peak| line_force(peak.force_per_length, units));
    row("force per length", MISSING.into(), line.unwrap_or_else(|| MISSING.into()));
    table.render(2, layout)
}

fn weld_name(place: Option<Place>, joint: &Joint) -> String {
    let weld = place.and_then(|place| joint.group.welds().get(place.weld));
    weld.map_or_else(|| MISSING.to_owned(), |weld| weld.name.clone())
}

fn coordinates(place: Option<Place>, units: UnitSystem) -> String {
    let shown = |place: Place| point(units, Dimension::Length, place.at.as_slice());
    place.map_or_else(|| MISSING.to_owned(), shown)
}

fn line_force(force: Vector, units: UnitSystem) -> String {
    quantity(units, Dimension::LineForce, force.norm())
}

/// What the numbers say, in sentences.
fn remarks(case: &CaseReport, joint: &Joint, layout: &Layout) -> String {
    let mut sentences = Vec::new();
    if let Some(failure) = case.not_solved() {
        sentences.push(format!(
            "The ultimate analysis has no answer: {}. Smallest relative unbalance met: {}. No number of it may \
             be used; the elastic result beside it is information.",
            failure.reason,
            small(failure.residual)
        ));
    }
    sentences.extend(case.ultimate_over_elastic().map(words::ratio));
    if !joint.accepts(Basis::Ultimate) && case.ultimate().is_some() {
        sentences.push(words::not_accepted(joint));
    }
    if let Some(answer) = case.ultimate() {
        sentences.extend(states(answer, joint.units));
    }
    sentences.extend(case.coefficients(joint).map(coefficients));
    sentences.iter().map(|sentence| hanging("  ", sentence, layout.columns())).collect()
}

/// States, peak and evidence of the ultimate analysis.
fn states(answer: &Ultimate, units: UnitSystem) -> Vec<String> {
    let mut sentences = Vec::new();
    let governing = answer.governing();
    if answer.states.len() > 1 {
        let others: Vec<String> = answer.states[1..]
            .iter()
            .map(|state| {
                let centre = state.centre.map_or_else(
                    || "translation".to_owned(),
                    |centre| format!("centre {}", point(units, Dimension::Length, &centre)),
                );
                format!("{} ({centre})", people(state.load_factor))
            })
            .collect();
        sentences.push(format!(
            "{} equilibrium states at first rupture were found; the smallest load factor is used. Others: {}.",
            answer.states.len(),
            others.join(", ")
        ));
        if let Some(reached) = answer.reached.and_then(|index| answer.states.get(index)) {
            let factor = people(reached.load_factor);
            sentences.push(format!("The path from zero load leads to the state of load factor {factor}."));
        }
    }
    sentences.push(answer.peak_load_factor.map_or_else(
        || "The path from zero load to first rupture was lost: no peak is reported.".to_owned(),
        |peak| format!("Largest load factor on the path from zero load to first rupture: {}.", people(peak)),
    ));
    sentences.push(format!(
        "Equilibrium holds to {} (relative unbalance); estimated relative error of the load factor {}.",
        small(governing.residual),
        small(governing.error_estimate)
    ));
    sentences
}

/// The dimensionless results.
fn coefficients(coefficients: Coefficients) -> String {
    let handbook = coefficients.handbook.map_or_else(String::new, |handbook| {
        format!(
            "; handbook C = {} kip/in (E70, per sixteenth of an inch of leg, on the longest straight line)",
            people(handbook)
        )
    });
    format!(
        "Coefficients: mean strength {} of the longitudinal strength{handbook}.",
        people(coefficients.mean_strength)
    )
}

/// The checks, the governing one first.
fn checks(case: &CaseReport, units: UnitSystem, layout: &Layout) -> String {
    let mut table = Table::new(&[
        ("check", Side::Flexible),
        ("demand", Side::Right),
        ("resistance", Side::Right),
        ("utilis.", Side::Right),
        ("verdict", Side::Left),
    ]);
    let exceeded_row = case.checks.iter().any(|check| check.accepted && !check.satisfied);
    // A satisfied case with an exceeded row: the code accepts the governing check in its place.
    let replaced = case.status == Status::Satisfied && exceeded_row;
    for check in &case.checks {
        let dimension = measure(check.in_moment);
        let missing = || MISSING.to_owned();
        let exceeded = check.accepted && !check.satisfied;
        let verdict = match (check.accepted, check.satisfied) {
            (false, _) => Cell::from("information"),
            (true, true) => Cell::emphasised("satisfied", Emphasis::Satisfied),
            (true, false) if replaced => Cell::from("exceeded"),
            (true, false) => Cell::emphasised("exceeded", Emphasis::Exceeded),
        };
        let used = check.design_utilisation().map(|value| utilisation(value, exceeded));
        let name = if check.clause.is_empty() {
            check.subject.clone()
        } else {
            format!("{}: {}", check.clause, check.subject)
        };
        table.row(vec![
            name.into(),
            quantity(units, dimension, check.demand).into(),
            check.design_resistance().map_or_else(missing, |value| quantity(units, dimension, value)).into(),
            used.unwrap_or_else(missing).into(),
            verdict,
        ]);
    }
    let mut block = table.render(2, layout);
    if replaced {
        let sentence = "The first check decides: the code accepts it in place of the others.";
        block.push_str(&hanging("  ", sentence, layout.columns()));
    }
    block
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_ratio_is_said_in_words() {
        assert_eq!(words::ratio(1.25), "The elastic method leaves 20.0 % of the ultimate strength unused.");
        assert_eq!(words::ratio(0.8), "The elastic method exceeds the ultimate strength by 25.0 %.");
        assert_eq!(words::ratio(1.000_001), "Both methods give practically the same nominal strength.");
    }

    #[test]
    fn coefficients_name_their_constants() {
        let text = coefficients(Coefficients { mean_strength: 1.234_56, handbook: Some(3.725_12) });
        assert!(text.contains("mean strength 1.235") && text.contains("C = 3.725 kip/in"), "{text}");
    }
}
