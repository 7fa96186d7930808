//! The welds to scale: bands as wide as the leg, coloured by deformation over its rupture limit.
//!
//! Neighbouring cells of one shade are drawn as one piece. A band narrower than [`THINNEST`] px is drawn that wide,
//! and the drawing says so. The run that ruptures first is drawn last: its shade is the one seen at a corner.

use super::super::canvas::{Area, Canvas, Spot, Stroke, spot};
use super::super::count::as_float;
use super::super::ink::{Ink, ramp};
use super::super::space::Space;
use super::super::view::{View, on_page};
use super::subject::Subject;
use crate::analysis::ElementRow;
use crate::model::{Joint, Run, Vector, Weld};
use crate::output::number::coordinate;

/// Shades of the ramp.
pub(super) const SHADES: usize = 20;
/// Least width of a band, px.
const THINNEST: f64 = 7.0;
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

/// A run with what is drawn of it.
struct Band<'r> {
    weld: &'r Weld,
    /// Index of the run in its weld.
    index: usize,
    stretches: Vec<Stretch>,
}

/// Width of a weld's band, px.
pub(super) fn width(weld: &Weld, view: &View) -> f64 {
    (weld.size.deformation_size() * view.scale).max(THINNEST)
}

/// Whether some band is wider than the scale makes it.
pub(super) fn widened(joint: &Joint, view: &View) -> bool {
    joint.group.welds().iter().any(|weld| weld.size.deformation_size() * view.scale < THINNEST)
}

/// Draws the welds and takes their place.
pub(super) fn draw(canvas: &mut Canvas, space: &mut Space, subject: &Subject<'_>, view: &View) {
    for band in bands(subject) {
        band.draw(canvas, view);
        take(space, &band.weld.runs[band.index], width(band.weld, view), view);
    }
}

/// All runs, the one that ruptures first last.
fn bands<'r>(subject: &Subject<'r>) -> Vec<Band<'r>> {
    let mut rest: &[ElementRow] = &subject.case.elements;
    let critical = subject.state().and_then(|state| state.critical.as_ref()).map(|critical| critical.place);
    let mut bands = Vec::new();
    let mut last = None;
    for (number, weld) in subject.joint().group.welds().iter().enumerate() {
        for index in 0..weld.runs.len() {
            let is_own = |row: &&ElementRow| row.weld == number && row.run == index;
            let (own, after) = rest.split_at(rest.iter().take_while(is_own).count());
            rest = after;
            let ratios: Vec<Option<f64>> = own.iter().map(|row| row.deformation_ratio).collect();
            let band = Band { weld, index, stretches: stretches(&ratios) };
            if critical.is_some_and(|place| place.weld == number && place.run == index) {
                last = Some(band);
            } else {
                bands.push(band);
            }
        }
    }
    bands.extend(last);
    bands
}

impl Band<'_> {
    fn draw(&self, canvas: &mut Canvas, view: &View) {
        let (run, width) = (&self.weld.runs[self.index], width(self.weld, view));
        let corners = corners(self.weld, self.index, view);
        canvas.path(&course(run, 0.0, 1.0, view), None, Some(Stroke::solid(Ink::TEXT, width + 2.0)));
        for corner in &corners {
            corner.draw(canvas, Ink::TEXT, width + 2.0);
        }
        // A little overlap, so that no gap shines through between neighbours.
        let overlap = OVERLAP / (run.length() * view.scale).max(OVERLAP);
        for stretch in &self.stretches {
            let to = (stretch.to + overlap).min(1.0);
            let stroke = Stroke::solid(stretch.ink(), width);
            canvas.path(&course(run, stretch.from, to, view), None, Some(stroke));
        }
        for corner in &corners {
            let end = if corner.at_start { self.stretches.first() } else { self.stretches.last() };
            if let Some(stretch) = end {
                corner.draw(canvas, stretch.ink(), width);
            }
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
        let unit = on_page(out);
        (share > 1e-3).then(|| Corner { at: view.spot(run.point(at)), unit, share, at_start })
    };
    let start = before.and_then(|before| corner(0.0, -run.tangent(0.0), -before.tangent(1.0), true));
    let end = after.and_then(|after| corner(1.0, run.tangent(1.0), after.tangent(0.0), false));
    start.into_iter().chain(end).collect()
}

/// Joins neighbours of one shade; the whole run without a shade where there are no cells.
fn stretches(cells: &[Option<f64>]) -> Vec<Stretch> {
    let count = as_float(cells.len());
    let mut stretches: Vec<Stretch> = Vec::new();
    for (index, ratio) in cells.iter().enumerate() {
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
            let radius = coordinate(radius * view.scale);
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
        space.take(Area { least: from.inf(&to) - half, most: from.sup(&to) + half });
        index += 1.0;
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn neighbours_of_one_shade_are_one_stretch() {
        let cells = [Some(0.01), Some(0.02), Some(0.99), Some(1.0), None];
        let found: Vec<(f64, Option<usize>)> =
            stretches(&cells).iter().map(|stretch| (stretch.to, stretch.shade)).collect();
        assert_eq!(found, [(0.4, Some(0)), (0.8, Some(SHADES - 1)), (1.0, None)]);
        assert_eq!(stretches(&[]).len(), 1);
    }
}
