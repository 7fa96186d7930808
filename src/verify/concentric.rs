//! Rules for loads through the centroid of a group of one weld size and one filler.
//!
//! * Linear group: all runs parallel; `R = F_l A (1 + a sin^1.5 theta)` at their one angle theta to the load.
//! * Longitudinal and transverse runs: `R = max(R_l + R_t, 0.85 R_l + 1.5 R_t)`.
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | F_l | `strength` | MPa | longitudinal strength per throat area |
//! | A | `area` | mm^2 | throat area of the runs |
//! | theta | `angle` | rad | between the load and a run |
//! | R_l, R_t | `along`, `across` | N | longitudinal strength of the runs along and across the load |
//!
//! Source: ANSI/AISC 360-22 J2.4, user note on linear weld groups, and J2.4(b); the factors are data.
//! Not applicable to a load with a moment about the centroid, to arcs, or to welds of several sizes or fillers.

use super::check::{Check, Demand, Topic};
use crate::model::{Basis, ConcentricRule, Joint, Run, Vector, Wrench};

/// Largest eccentricity over the length of weld for a load to count as concentric: far below any tolerance of
/// fabrication, and enough for a centroid typed to a tenth of a millimetre on a metre of weld.
const CONCENTRIC: f64 = 1e-4;
/// Largest deviation of a run from an exact direction, rad.
const ALIGNED: f64 = 1e-6;

/// The concentric rules of a rule set that apply to a load given about the weld centroid.
#[must_use]
pub fn concentric_checks(joint: &Joint, load: &Wrench) -> Vec<Check> {
    let (group, rules) = (&joint.group, &joint.rules);
    let Some(weld) = group.uniform() else { return Vec::new() };
    let runs: Vec<&Run> = group.welds().iter().flat_map(|weld| &weld.runs).collect();
    let length: f64 = runs.iter().map(|run| run.length()).sum();
    let force = load.force.norm();
    let straight = runs.iter().all(|run| matches!(run, Run::Straight { .. }));
    if !straight || force == 0.0 || load.moment.norm() > CONCENTRIC * force * length {
        return Vec::new();
    }
    let direction = load.force / force;
    let strength = rules.longitudinal.value * weld.filler.strength * weld.total_throat();
    let demand = Demand::of(load);
    rules
        .concentric
        .iter()
        .filter_map(|rule| {
            let (topic, resistance) = resistance(rule, &runs, &direction)?;
            Some(Check::new(topic, resistance * strength / force, 4.0 * f64::EPSILON, demand, joint))
        })
        .collect()
}

/// The strength by one rule over the longitudinal strength per length, mm; `None` where it does not apply.
fn resistance(rule: &ConcentricRule, runs: &[&Run], direction: &Vector) -> Option<(Topic, f64)> {
    match rule {
        ConcentricRule::LinearGroup { id, clause, increase } => {
            let tangent = runs[0].tangent(0.0);
            if runs.iter().any(|run| run.tangent(0.0).cross(&tangent).norm() > ALIGNED) {
                return None;
            }
            let length: f64 = runs.iter().map(|run| run.length()).sum();
            let sine = tangent.cross(direction).norm().min(1.0);
            let topic = topic(id, clause, "linear group, load through the centroid");
            Some((topic, length * (1.0 + increase.value * sine.powf(1.5))))
        }
        ConcentricRule::LongitudinalTransverse { id, clause, longitudinal, transverse } => {
            let (mut along, mut across) = (0.0, 0.0);
            for run in runs {
                let tangent = run.tangent(0.0);
                if tangent.cross(direction).norm() <= ALIGNED {
                    along += run.length();
                } else if tangent.dot(direction).abs() <= ALIGNED {
                    across += run.length();
                } else {
                    return None;
                }
            }
            if along == 0.0 || across == 0.0 {
                return None;
            }
            let topic = topic(id, clause, "longitudinal and transverse welds, load through the centroid");
            Some((topic, (along + across).max(longitudinal.value * along + transverse.value * across)))
        }
    }
}

fn topic(id: &str, clause: &str, subject: &str) -> Topic {
    Topic { id: id.into(), basis: Basis::Concentric, clause: clause.into(), subject: subject.into() }
}
