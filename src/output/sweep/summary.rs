//! What the numbers of a sweep say, in sentences.

use super::labels::Labels;
use crate::model::Basis;
use crate::output::layout::{Emphasis, Layout};
use crate::output::number::{people, percent, utilisation};
use crate::output::table::hanging;
use crate::output::words;
use crate::study::sweep::{Crossing, Extremes, GroupedFault, Sweep};

/// Crossings that are told one by one.
const MOST_CROSSINGS: usize = 6;
/// Difference of two ratios that no table shows.
const SAME_RATIO: f64 = 5e-4;

/// The summary as a block of text.
pub(super) fn text(sweep: &Sweep, labels: &Labels<'_>, layout: &Layout) -> String {
    let mut sentences = sentences(sweep, labels);
    if sweep.variables.len() > 1 {
        // The table of a single variable says the same in its footnotes.
        sentences.extend(out_of_the_ordinary(sweep));
    }
    if sentences.is_empty() {
        return String::new();
    }
    let mut block = (layout.paint)(Emphasis::Heading, "In short") + "\n";
    for sentence in sentences {
        block.push_str(&hanging("  - ", &sentence, layout.columns()));
    }
    block
}

/// What the numbers say, sentence by sentence.
pub(in crate::output) fn sentences(sweep: &Sweep, labels: &Labels<'_>) -> Vec<String> {
    let mut sentences = Vec::new();
    sentences.extend(crossings(&sweep.crossings(), labels));
    sentences.extend(sweep.extremes().map(|extremes| self::extremes(extremes, labels)).unwrap_or_default());
    sentences.extend(jumps(sweep, labels));
    if !sweep.joint.accepts(Basis::Ultimate) {
        sentences.push(words::not_accepted(&sweep.joint));
    }
    sentences.extend(sweep.faults().iter().map(|found| no_joint(found, labels)));
    sentences
}

/// How many points have several states, lack one, or are governed by another case.
pub(in crate::output) fn out_of_the_ordinary(sweep: &Sweep) -> Vec<String> {
    let mut sentences = Vec::new();
    sentences.extend(governed_by_others(sweep));
    let concentric = sweep.decided_by(Basis::Concentric);
    if concentric > 0 {
        sentences.push(format!(
            "At {} a rule for loads through the centroid decides; it holds there alone, so nothing may be interpolated \
             beside it.",
            points(concentric)
        ));
    }
    let several = sweep.with_several_states();
    if several > 0 {
        sentences.push(format!(
            "At {several} of {} points several equilibrium states at first rupture were found; the smallest load \
             factor is used.",
            sweep.points.len()
        ));
    }
    let incomplete = sweep.incomplete();
    if incomplete > 0 {
        sentences.push(format!(
            "At {} the search saw signs of a state it could not find: a smaller strength is possible there.",
            points(incomplete)
        ));
    }
    sentences
}

fn crossings(crossings: &[Crossing], labels: &Labels<'_>) -> Vec<String> {
    let sentence = |crossing: &Crossing| {
        let [a, b] = crossing.utilisation;
        let holds_first = crossing.holds_first;
        format!(
            "The joint {} to hold between {} (utilisation {}) and {} ({}).",
            if holds_first { "ceases" } else { "begins" },
            labels.point(crossing.points[0]),
            utilisation(a, !holds_first),
            labels.value(0, crossing.points[1]),
            utilisation(b, holds_first)
        )
    };
    let mut sentences: Vec<String> = crossings.iter().take(MOST_CROSSINGS).map(sentence).collect();
    if crossings.len() > MOST_CROSSINGS {
        sentences.push(format!("The verdict changes {} times in all.", crossings.len()));
    }
    sentences
}

/// The cases other than the shown one that govern somewhere.
fn governed_by_others(sweep: &Sweep) -> Option<String> {
    let others: Vec<String> = sweep
        .governing_cases()
        .into_iter()
        .filter(|(case, _)| *case != sweep.shown)
        .filter_map(|(case, count)| Some(format!("{} ({})", sweep.cases.get(case)?, points(count))))
        .collect();
    (!others.is_empty()).then(|| format!("Another case governs: {}.", others.join(", ")))
}

/// Why points have no joint.
fn no_joint(found: &GroupedFault, labels: &Labels<'_>) -> String {
    let others = match found.points.len() {
        0 | 1 => String::new(),
        count => format!(" and {} more", count - 1),
    };
    let at = found.points.first().map_or_else(String::new, |point| labels.point(*point));
    let fault = &found.fault;
    let place = fault.place.as_ref().map_or_else(
        || fault.file.clone(),
        |place| format!("{}:{}:{}", fault.file, place.line, place.column),
    );
    format!("No joint at {at}{others}: {} ({place}).", fault.message)
}

fn points(count: usize) -> String {
    format!("{count} {}", if count == 1 { "point" } else { "points" })
}

fn extremes(extremes: Extremes, labels: &Labels<'_>) -> Vec<String> {
    let (largest, smallest) = (extremes.largest.1, extremes.smallest.1);
    let sentence = |what: &str, (point, ratio): (usize, f64)| {
        let at = labels.point(point);
        format!("{what} ratio of the methods, {}, at {at}. {}", people(ratio), words::ratio(ratio))
    };
    if largest - smallest < SAME_RATIO {
        return vec![format!(
            "The ratio of the methods is {} throughout. {}",
            people(largest),
            words::ratio(largest)
        )];
    }
    vec![sentence("Largest", extremes.largest), sentence("Smallest", extremes.smallest)]
}

fn jumps(sweep: &Sweep, labels: &Labels<'_>) -> Option<String> {
    let largest = sweep.largest_jump()?;
    let count = sweep.jumps.len();
    let (between, size) = (labels.point(largest.points[0]), percent(largest.relative_change()));
    let places = if count == 1 { "once".to_owned() } else { format!("{count} times") };
    Some(format!(
        "The ultimate strength jumps {places} between neighbouring points, by up to {size} (next to {between}): an \
         equilibrium state appears or vanishes there. Between the two sides nothing may be interpolated."
    ))
}
