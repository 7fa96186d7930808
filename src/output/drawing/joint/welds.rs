//! The welds to scale: bands as wide as the leg, coloured by deformation over its rupture limit.
//!
//! Neighbouring cells of one shade are drawn as one piece. A band narrower than [`THINNEST`] px is drawn that wide, and the drawing says so.

use super::super::canvas::{Canvas, Spot, Stroke, spot};
use super::super::canvas::{SMALL, Text};
use super::super::ink::{Ink, as_float, ramp};
use super::super::space::{Label, Space};
use super::super::view::View;
use super::subject::Subject;
use crate::model::{Joint, Run, Vector, Weld};
use crate::output::number::length;

/// Shades of the ramp.
pub(super) const SHADES: usize = 20;
/// Least width of a band, px.
const THINNEST: f64 = 7.0;
/// Up to this many welds each has its name at it.
const NAMED: usize = 8;
/// Up to this many welds each has its size at it.
const LABELLED: usize = 60;
/// How far a band reaches under the next, px.
const OVERLAP: f64 = 0.5;
/// Straight pieces an arc of a whole turn is drawn with where only its course matters.
const CHORDS: f64 = 48.0;

/// A piece of a run of one shade.
struct Stretch {
    from: f64,
    to: f64,
    shade: Option<usize>,
}

impl Stretch {
    fn ink(&self) -> Ink {
        self.shade.map_or(Ink::UNKNOWN, |shade| ramp(as_float(shade) / as_float(SHADES - 1)))
    }
}

/// Width of a weld's band, px.
pub(super) fn band(weld: &Weld, view: &View) -> f64 {
    (weld.size.deformation_size() * view.scale).max(THINNEST)
}

/// Whether some band is wider than the scale makes it.
pub(super) fn widened(joint: &Joint, view: &View) -> bool {
    joint.group.welds().iter().any(|weld| weld.size.deformation_size() * view.scale < THINNEST)
}

/// Draws the welds and takes their place.
pub(super) fn draw(canvas: &mut Canvas, space: &mut Space, subject: &Subject<'_>, view: &View) {
    for (index, weld) in subject.joint().group.welds().iter().enumerate() {
        let width = band(weld, view);
        let ratios: Vec<(f64, Option<f64>)> = subject
            .case
            .elements
            .iter()
            .filter(|row| row.weld == index)
            .map(|row| (row.length, row.deformation_ratio))
            .collect();
        let mut rest = ratios.as_slice();
        for (index_of_run, run) in weld.runs.iter().enumerate() {
            let corners = corners(weld, index_of_run, view);
            canvas.path(&course(run, 0.0, 1.0, view), None, Some(Stroke::solid(Ink::TEXT, width + 2.0)));
            for corner in &corners {
                corner.draw(canvas, Ink::TEXT, width + 2.0);
            }
            let count = rest.first().map_or(0, |(cell, _)| cells(run, *cell)).min(rest.len());
            let (own, after) = rest.split_at(count);
            rest = after;
            let stretches = stretches(own);
            // A little overlap, so that no gap shines through between neighbours.
            let overlap = OVERLAP / (run.length() * view.scale).max(OVERLAP);
            for stretch in &stretches {
                let to = (stretch.to + overlap).min(1.0);
                canvas.path(
                    &course(run, stretch.from, to, view),
                    None,
                    Some(Stroke::solid(stretch.ink(), width)),
                );
            }
            for corner in &corners {
                if let Some(stretch) = if corner.at_start { stretches.first() } else { stretches.last() } {
                    corner.draw(canvas, stretch.ink(), width);
                }
            }
            take(space, run, width, view);
        }
    }
}

/// A band that goes on over the corner where its weld turns, to the mitre.
struct Corner {
    at: Spot,
    /// Out of the run.
    unit: Spot,
    /// Length over the width of the band.
    share: f64,
    at_start: bool,
}

impl Corner {
    fn draw(&self, canvas: &mut Canvas, ink: Ink, width: f64) {
        let back = self.at - self.unit * OVERLAP;
        canvas.line(back, self.at + self.unit * (self.share * width), Stroke::solid(ink, width));
    }
}

/// The corners at the ends of a run.
fn corners(weld: &Weld, index: usize, view: &View) -> Vec<Corner> {
    let run = &weld.runs[index];
    let before = index.checked_sub(1).and_then(|index| weld.runs.get(index));
    let after = weld.runs.get(index + 1);
    let corner = |at: f64, out: Vector, onward: Vector, at_start: bool| {
        // Half the width times tan of half the turn closes the corner; a sharper turn is left blunt.
        let turn = out.dot(&onward).clamp(-1.0, 1.0).acos();
        let share = 0.5 * (0.5 * turn).tan().min(1.0);
        let unit = super::super::view::on_page(out);
        (share > 1e-3).then(|| Corner { at: view.spot(run.point(at)), unit, share, at_start })
    };
    let start = before.and_then(|before| corner(0.0, -run.tangent(0.0), -before.tangent(1.0), true));
    let end = after.and_then(|after| corner(1.0, run.tangent(1.0), after.tangent(0.0), false));
    start.into_iter().chain(end).collect()
}

/// Cells of this length on a run.
fn cells(run: &Run, cell: f64) -> usize {
    // A whole number by construction, far below 2^32.
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)]
    let count = (run.length() / cell).round() as usize;
    count
}

/// Joins neighbours of one shade; the whole run without a shade where there are no cells.
fn stretches(cells: &[(f64, Option<f64>)]) -> Vec<Stretch> {
    let count = as_float(cells.len());
    let mut stretches: Vec<Stretch> = Vec::new();
    for (index, (_, ratio)) in cells.iter().enumerate() {
        let shade = ratio.map(shade);
        let to = as_float(index + 1) / count;
        match stretches.last_mut() {
            Some(last) if last.shade == shade => last.to = to,
            Some(_) | None => stretches.push(Stretch { from: as_float(index) / count, to, shade }),
        }
    }
    if stretches.is_empty() {
        stretches.push(Stretch { from: 0.0, to: 1.0, shade: None });
    }
    stretches
}

/// The shade of a ratio.
fn shade(ratio: f64) -> usize {
    // Clamped to the shades, so small and not negative.
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)]
    let shade = (ratio.clamp(0.0, 1.0) * as_float(SHADES)).floor() as usize;
    shade.min(SHADES - 1)
}

/// Path data of a part of a run.
fn course(run: &Run, from: f64, to: f64, view: &View) -> String {
    let begin = spot(view.spot(run.point(from)));
    match run {
        Run::Straight { .. } => format!("M{begin}L{}", spot(view.spot(run.point(to)))),
        Run::Arc { radius, sweep, .. } => {
            // Two halves, because an SVG arc that ends where it begins is nothing.
            let radius = crate::output::number::coordinate(radius * view.scale);
            let turn = u8::from(*sweep < 0.0);
            let half = |at: f64| format!("A{radius} {radius} 0 0 {turn} {}", spot(view.spot(run.point(at))));
            format!("M{begin}{}{}", half(0.5 * (from + to)), half(to))
        }
    }
}

/// Takes the place of a band: boxes along it, so that texts keep off.
fn take(space: &mut Space, run: &Run, width: f64, view: &View) {
    let chords = match run {
        Run::Straight { .. } => 1.0,
        Run::Arc { sweep, .. } => (CHORDS * sweep.abs() / std::f64::consts::TAU).ceil(),
    };
    let length = run.length() * view.scale;
    let boxes = (length / width.max(4.0)).ceil().clamp(chords, 400.0);
    let at = |index: f64| view.spot(run.point(index / boxes));
    let mut index = 0.0;
    while index < boxes {
        let (from, to) = (at(index), at(index + 1.0));
        let half = Spot::new(width, width) / 2.0;
        space.take(super::super::canvas::Area { least: from.inf(&to) - half, most: from.sup(&to) + half });
        index += 1.0;
    }
}

/// The size of a weld in words.
pub(super) fn size(weld: &Weld, joint: &Joint) -> String {
    let own = |value: f64| length(joint.units, value);
    let size = match weld.size.legs() {
        #[allow(clippy::float_cmp)] // equal as given; nothing is computed
        Some([first, second]) if first == second => format!("leg {}", own(first)),
        Some([first, second]) => format!("legs {} / {}", own(first), own(second)),
        None => format!("throat {}", own(weld.size.throat())),
    };
    if weld.sides == 2 { format!("{size}, both sides") } else { size }
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

/// Puts a label beside the longest run that has room for it.
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
    for run in runs {
        for share in [0.5, 0.25, 0.75] {
            let at = run.point(share);
            let wish = view.spot(at);
            let outward = outward(at, run.tangent(share), subject.centroid());
            let direction = super::super::view::on_page(outward);
            let reach = 0.5 * band(weld, view) + 4.0;
            let label = Label { text: text.clone(), wish, reach, direction };
            if let Some(placed) = space.label(canvas, &label) {
                if placed.led {
                    super::marks::lead(canvas, wish, &placed.area);
                }
                return true;
            }
        }
    }
    false
}

/// Across the weld, away from the centroid.
fn outward(at: Vector, tangent: Vector, centroid: Vector) -> Vector {
    let across = Vector::new(tangent.y, -tangent.x, 0.0);
    if across.dot(&(at - centroid)) < 0.0 { -across } else { across }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn neighbours_of_one_shade_are_one_stretch() {
        let cells = [(1.0, Some(0.01)), (1.0, Some(0.02)), (1.0, Some(0.99)), (1.0, Some(1.0)), (1.0, None)];
        let found: Vec<(f64, Option<usize>)> =
            stretches(&cells).iter().map(|stretch| (stretch.to, stretch.shade)).collect();
        assert_eq!(found, [(0.4, Some(0)), (0.8, Some(SHADES - 1)), (1.0, None)]);
        assert_eq!(stretches(&[]).len(), 1);
    }
}
