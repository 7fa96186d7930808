//! The size of every weld in words, beside it.

use super::super::canvas::{Canvas, SMALL, Spot, Text};
use super::super::space::{Label, Space};
use super::super::view::{View, on_page};
use super::bands;
use super::subject::Subject;
use crate::model::{Joint, Run, Vector, Weld};
use crate::output::number::{degrees, leg, length};
use std::f64::consts::FRAC_PI_2;

/// Up to this many welds each has its name at it.
const NAMED: usize = 8;
/// Up to this many welds each has its size at it.
const LABELLED: usize = 60;
/// Deviation from a right angle that is told, rad.
const SQUARE: f64 = 1e-6;
/// Runs of a weld beside which a label is tried.
const RUNS_TRIED: usize = 4;

/// The size of a weld in words.
pub(super) fn size(weld: &Weld, joint: &Joint) -> String {
    let own = |value: f64| leg(joint.units, value);
    let size = match weld.size.legs() {
        #[allow(clippy::float_cmp)] // equal as given; nothing is computed
        Some([first, second]) if first == second => format!("leg {}", own(first)),
        Some([first, second]) => format!("legs {} / {}", own(first), own(second)),
        None => format!("throat {}", length(joint.units, weld.size.throat())),
    };
    let dihedral = weld.size.dihedral();
    let skew = (dihedral - FRAC_PI_2).abs() > SQUARE;
    let angle = if skew { format!(" at {}", degrees(dihedral)) } else { String::new() };
    let sides = if weld.sides == 2 { ", both sides" } else { "" };
    format!("{size}{angle}{sides}")
}

/// The radius of a weld that is one arc, in words.
fn radius(weld: &Weld, joint: &Joint) -> String {
    match weld.runs.as_slice() {
        [Run::Arc { radius, .. }] => format!(", radius {}", length(joint.units, *radius)),
        _ => String::new(),
    }
}

/// Puts the size at every weld, with its name where there are few; the number of welds left without.
pub(super) fn label(canvas: &mut Canvas, space: &mut Space, subject: &Subject<'_>, view: &View) -> usize {
    let joint = subject.joint();
    let welds = joint.group.welds();
    if welds.len() > LABELLED {
        return welds.len();
    }
    let mut missed = 0;
    for weld in welds {
        let size = size(weld, joint);
        let words =
            if welds.len() <= NAMED { format!("{}: {size}{}", weld.name, radius(weld, joint)) } else { size };
        if !put(canvas, space, subject, view, weld, &words) {
            missed += 1;
        }
    }
    missed
}

/// Puts a label where there is most room beside one of the longest runs.
fn put(
    canvas: &mut Canvas,
    space: &mut Space,
    subject: &Subject<'_>,
    view: &View,
    weld: &Weld,
    words: &str,
) -> bool {
    let mut runs: Vec<&Run> = weld.runs.iter().collect();
    runs.sort_by(|a, b| b.length().total_cmp(&a.length()));
    let text = Text { size: SMALL, ..Text::new(words, Spot::zeros()) };
    let mut labels = Vec::new();
    for run in runs.into_iter().take(RUNS_TRIED) {
        for share in [0.5, 0.25, 0.75, 0.0, 1.0] {
            let at = run.point(share);
            let outward = outward(at, run.tangent(share), subject.centroid());
            labels.push(Label {
                text: text.clone(),
                wish: view.spot(at),
                reach: 0.5 * bands::width(weld, view) + 4.0,
                direction: on_page(outward),
            });
        }
    }
    space.lead_label(canvas, &labels)
}

/// Across the weld, away from the centroid.
fn outward(at: Vector, tangent: Vector, centroid: Vector) -> Vector {
    let across = Vector::new(tangent.y, -tangent.x, 0.0);
    if across.dot(&(at - centroid)) < 0.0 { -across } else { across }
}
