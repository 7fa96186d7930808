//! The share of the given load that each piece of weld carries, by both methods.
//!
//! The elastic force is a broad light arrow, the ultimate one a slender dark arrow on it, both from the middle of
//! the piece and on one scale of force per length. Where cells are dense only some are drawn.

use super::super::arrow::Arrow;
use super::super::canvas::{Canvas, Spot};
use super::super::ink::Ink;
use super::super::space::Space;
use super::super::view::{View, on_page};
use super::subject::Subject;
use crate::analysis::{CellForce, ElementRow};

/// Longest arrow over the diagonal of the group on the page, and its bounds in px.
const LONGEST: (f64, f64, f64) = (0.16, 26.0, 72.0);
/// Least distance of arrows along a weld, px.
const SPACING: f64 = 20.0;
/// Cosine of the angle between force and weld from which arrows begin to cover each other.
const MOSTLY_ALONG: f64 = 0.7;
/// Most arrows of one method.
const MOST: usize = 160;
/// Distance at which every weld is down to one arrow, px: the page is narrower.
const FEWEST: f64 = 2000.0;

/// The elastic method.
pub(super) const ELASTIC: Arrow = Arrow { ink: Ink::ELASTIC, width: 5.0, head: 13.0 };
/// The ultimate method.
pub(super) const ULTIMATE: Arrow = Arrow { ink: Ink::ULTIMATE, width: 1.7, head: 8.0 };

/// An arrow on the page.
#[derive(Debug, Clone, Copy)]
pub(super) struct Force {
    pub(super) tail: Spot,
    pub(super) tip: Spot,
    pub(super) elastic: bool,
}

/// Arrows and their scale.
#[derive(Debug, Clone, Default)]
pub(super) struct Forces {
    pub(super) arrows: Vec<Force>,
    /// Force per length of the longest arrow, N/mm.
    pub(super) greatest: f64,
    /// Pieces that have arrows.
    pub(super) count: usize,
}

/// The arrows of a case.
pub(super) fn arrows(subject: &Subject<'_>, view: &View) -> Forces {
    let chosen = chosen(subject, view);
    let size = |force: &CellForce| force.force_per_length;
    let greatest = chosen
        .iter()
        .flat_map(|row| [Some(size(&row.elastic)), row.ultimate.as_ref().map(size)])
        .flatten()
        .fold(0.0, f64::max);
    if greatest <= 0.0 {
        return Forces::default();
    }
    let longest = longest(subject, view);
    let arrow = |row: &ElementRow, force: &CellForce, elastic: bool| {
        let direction = on_page(force.force);
        let tail = view.spot(row.at);
        let length = longest * force.force_per_length / greatest;
        (direction.norm() > 0.0).then(|| Force { tail, tip: tail + direction.normalize() * length, elastic })
    };
    let elastic = chosen.iter().filter_map(|row| arrow(row, &row.elastic, true));
    let ultimate = chosen.iter().filter_map(|row| arrow(row, row.ultimate.as_ref()?, false));
    Forces { arrows: elastic.chain(ultimate).collect(), greatest, count: chosen.len() }
}

/// Length of the longest arrow, px.
fn longest(subject: &Subject<'_>, view: &View) -> f64 {
    let (share, least, most) = LONGEST;
    (share * subject.size() * view.scale).clamp(least, most)
}

/// The rows that get an arrow: some of every weld as far as the page has room.
fn chosen<'r>(subject: &Subject<'r>, view: &View) -> Vec<&'r ElementRow> {
    let welds: Vec<&[ElementRow]> = subject.case.elements.chunk_by(|a, b| a.weld == b.weld).collect();
    let stride = welds.len().div_ceil(MOST).max(1);
    let (mut gap, longest) = (SPACING, longest(subject, view));
    loop {
        let chosen: Vec<&ElementRow> = welds
            .iter()
            .step_by(stride)
            .flat_map(|rows| evenly(rows, (gap + along(rows) * longest) / view.scale))
            .collect();
        if chosen.len() <= MOST || gap > FEWEST {
            return chosen;
        }
        gap *= 1.5;
    }
}

/// How far arrows lie along their weld, 0 to 1, by their mean cosine.
fn along(rows: &[ElementRow]) -> f64 {
    let cosines: Vec<f64> = rows.iter().filter_map(|row| row.angle).map(f64::cos).collect();
    let mean = cosines.iter().sum::<f64>() / super::super::count::as_float(cosines.len().max(1));
    ((mean - MOSTLY_ALONG) / (1.0 - MOSTLY_ALONG)).max(0.0).powi(2)
}

/// Rows of one weld about `gap` mm apart, at least one.
fn evenly(rows: &[ElementRow], gap: f64) -> Vec<&ElementRow> {
    let total: f64 = rows.iter().map(|row| row.length).sum();
    let count = (total / gap).floor().max(1.0);
    let mut chosen = Vec::new();
    let mut end = 0.0;
    let mut next = 0.5 * total / count;
    for row in rows {
        end += row.length;
        if end >= next {
            chosen.push(row);
            // A row longer than the gap stands for all the places within it.
            while next <= end {
                next += total / count;
            }
        }
    }
    chosen
}

/// Draws the arrows and takes their place.
pub(super) fn draw(canvas: &mut Canvas, space: &mut Space, forces: &Forces) {
    for force in &forces.arrows {
        if force.elastic {
            ELASTIC.draw(canvas, force.tail, force.tip);
        } else {
            ULTIMATE.draw_rimmed(canvas, force.tail, force.tip);
        }
        space.take_line(force.tail, force.tip);
    }
}
