//! Two variables: maps of strength by both methods, their ratio, and the utilisation, with contours.
//!
//! A line of contour is where the value, linear between solved points, is the number at it. Where the strength jumps
//! each point's value reaches half way to the next. Beside a point without an answer the map is blank, and that of the
//! utilisation also where another case or analysis decides; a point between blank cells is a dot.

use super::super::canvas::{Anchor, Area, Canvas, SMALL, Spot, Stroke, Text, outline};
use super::super::count::as_float;
use super::super::font;
use super::super::ink::{Ink, ramp};
use super::super::sheet;
use super::super::space::Space;
use super::field::{Field, Place, Seam};
use super::notes;
use super::plot::{Plot, plain, range, ticks};
use crate::output::number::{people, trimmed, utilisation};
use crate::study::sweep::{Jump, Point, Sweep, Variable};
use std::collections::BTreeMap;

/// Width of the page, px; its height follows from the lines below the maps.
const WIDTH: f64 = 1200.0;
/// From the lower maps to the first line below them, px.
const BELOW: f64 = 66.0;
/// From the last line to the end of the page, px.
const FOOT: f64 = 50.0;
/// Left edges of the maps.
const LEFT: [f64; 2] = [80.0, 676.0];
/// Upper edges of the maps.
const TOP: [f64; 2] = [128.0, 508.0];
/// Size of a map, px.
const SIZE: (f64, f64) = (430.0, 296.0);
/// Most levels of a map.
const LEVELS: usize = 9;
/// Radius of a point that stands for itself, px.
const ALONE: f64 = 3.2;
/// Utilisation at which a joint ceases to hold.
const LIMIT: f64 = 1.0;

/// What a map shows.
struct Map<'s> {
    title: String,
    value: &'s dyn Fn(&Point) -> Option<f64>,
    /// What lies between two neighbouring points, by index.
    seam: &'s dyn Fn([usize; 2]) -> Seam,
    /// Whether it is the utilisation, which has a limit and is rounded up.
    is_utilisation: bool,
}

/// The page.
pub(super) fn drawn(sweep: &Sweep, across: &Variable, up: &Variable) -> Canvas {
    let lines = notes::lines(sweep, WIDTH - 2.0 * sheet::MARGIN);
    let below = TOP[1] + SIZE.1 + BELOW;
    let height = below + font::LEADING * SMALL * as_float(lines.len()) + FOOT;
    let mut canvas = Canvas::new(WIDTH, height.ceil());
    sheet::head(&mut canvas, None, &sweep.joint.title, &notes::subject(sweep));
    let unit = sweep.joint.units.symbol(notes::measure(sweep));
    let ultimate = |point: &Point| notes::strength(sweep, point, |case| Some(case.ultimate?.load_factor));
    let elastic = |point: &Point| notes::strength(sweep, point, |case| Some(case.elastic?.load_factor));
    let ratio = |point: &Point| sweep.shown_case(point)?.ultimate_over_elastic();
    let utilisation = |point: &Point| point.outcome.as_ref().ok()?.utilisation();
    let jumps: BTreeMap<[usize; 2], &Jump> = sweep.jumps.iter().map(|jump| (jump.points, jump)).collect();
    let jumps_at = |pair: [usize; 2]| if jumps.contains_key(&pair) { Seam::Step } else { Seam::Joined };
    let joined = |_: [usize; 2]| Seam::Joined;
    let decided = |pair: [usize; 2]| {
        let [one, next] = pair.map(|index| sweep.points.get(index).and_then(notes::deciding));
        // Where another case or analysis decides is not searched, and jumps are searched for the shown case alone.
        match (one == next, jumps.get(&pair)) {
            (false, _) => Seam::Gap,
            (true, Some(jump)) if sweep.decides_at(jump) => Seam::Step,
            (true, _) => Seam::Joined,
        }
    };
    let strength = |name: &str| format!("nominal {name} strength, {unit}");
    let maps = [
        Map { title: strength("ultimate"), value: &ultimate, seam: &jumps_at, is_utilisation: false },
        Map { title: strength("elastic"), value: &elastic, seam: &joined, is_utilisation: false },
        Map { title: "ultimate / elastic".into(), value: &ratio, seam: &jumps_at, is_utilisation: false },
        Map {
            title: notes::utilisation(sweep).into(),
            value: &utilisation,
            seam: &decided,
            is_utilisation: true,
        },
    ];
    for (index, map) in maps.iter().enumerate() {
        let (left, top) = (LEFT[index % 2], TOP[index / 2]);
        let plot = Plot::new(
            Area::new(left, top, left + SIZE.0, top + SIZE.1),
            range(across.values.iter().map(|value| across.shown(*value))),
            range(up.values.iter().map(|value| up.shown(*value))),
        )
        .in_units(&across.unit, &up.unit);
        draw(&mut canvas, sweep, [across, up], map, &plot);
    }
    canvas.lines(&lines, Spot::new(sheet::MARGIN, below), SMALL, Ink::TEXT);
    sheet::foot(&mut canvas, &sweep.joint);
    canvas
}

fn draw(canvas: &mut Canvas, sweep: &Sweep, [across, up]: [&Variable; 2], map: &Map<'_>, plot: &Plot) {
    // The first variable runs slowest.
    let index = |column: usize, row: usize| column * up.values.len() + row;
    let value = |column: usize, row: usize| sweep.points.get(index(column, row)).and_then(map.value);
    let seam = |[a, b]: [usize; 2], [c, d]: [usize; 2]| (map.seam)([index(a, b), index(c, d)]);
    let field = Field::new(across.values.len(), up.values.len(), value, seam);
    let spot = |place: Place| {
        let at = |variable: &Variable, share: f64| {
            let last = as_float(variable.values.len() - 1);
            variable.shown(variable.from() + (variable.to() - variable.from()) * share / last)
        };
        plot.spot(at(across, place[0]), at(up, place[1]))
    };
    let titles = [notes::axis(across), notes::axis(up), map.title.clone()];
    canvas.area(&plot.area, Some(Ink::HAIR), None);
    let Some(extent) = field.extent() else {
        plot.axes_over(canvas, &titles);
        return;
    };
    let extent = range(extent.into_iter());
    let levels: Vec<f64> =
        ticks(extent, LEVELS).into_iter().filter(|level| *level > extent[0] && *level < extent[1]).collect();
    let bands = as_float(levels.len()).max(1.0);
    let mut fill = |level: f64, ink: Ink| {
        let polygons: Vec<String> = field
            .above(level)
            .into_iter()
            .map(|polygon| outline(&polygon.into_iter().map(spot).collect::<Vec<_>>(), true))
            .collect();
        canvas.path(&polygons.concat(), Some(ink), None);
    };
    fill(f64::NEG_INFINITY, shade(0.0));
    for (band, level) in (1..).zip(&levels) {
        fill(*level, shade(as_float(band) / bands));
    }
    for (place, value) in field.alone() {
        let below = levels.iter().filter(|level| **level <= value).count();
        let outline = Stroke::solid(Ink::TEXT, 1.0);
        canvas.circle(spot(place), ALONE, Some(shade(as_float(below) / bands)), Some(outline));
    }
    let mut space = Space::new(plot.area.grown(-4.0));
    let limit = map.is_utilisation.then_some(LIMIT);
    if let (Some(x), Some(y)) = (across.given, up.given) {
        let at = plot.spot(across.shown(x), up.shown(y));
        space.take(Area::around(at, Spot::new(18.0, 18.0)));
        contours(canvas, &mut space, &field, &levels, limit, &spot);
        as_given(canvas, plot, at);
    } else {
        contours(canvas, &mut space, &field, &levels, limit, &spot);
    }
    plot.axes_over(canvas, &titles);
    legend(canvas, plot, &levels, extent, map.is_utilisation);
}

/// A cross at the values that the file has.
fn as_given(canvas: &mut Canvas, plot: &Plot, at: Spot) {
    if plot.area.contains(at) {
        for (ink, width) in [(Ink::PAPER, 4.4), (Ink::TEXT, 1.8)] {
            for across in [Spot::new(6.0, 6.0), Spot::new(6.0, -6.0)] {
                canvas.line(at - across, at + across, Stroke::solid(ink, width));
            }
        }
    }
}

/// The paler part of the ramp, so that lines and numbers show on it.
fn shade(share: f64) -> Ink {
    ramp(0.72 * share)
}

#[allow(clippy::float_cmp)] // a level that is the limit is exactly it
fn contours(
    canvas: &mut Canvas,
    space: &mut Space,
    field: &Field,
    levels: &[f64],
    limit: Option<f64>,
    spot: &dyn Fn(Place) -> Spot,
) {
    let is_usual = |(level, _): &(&f64, String)| limit != Some(**level);
    let usual = levels.iter().zip(plain(levels)).filter(is_usual);
    let usual = usual.map(|(level, words)| (*level, words, Stroke::solid(Ink::TEXT, 1.0)));
    let strong = limit.map(|limit| (limit, trimmed(limit), Stroke::solid(Ink::EXCEEDED, 2.6)));
    let mut lines: Vec<(String, Ink, Vec<[Spot; 2]>)> = Vec::new();
    for (level, words, stroke) in usual.chain(strong) {
        let mut pieces: Vec<[Spot; 2]> = field.line(level).into_iter().map(|piece| piece.map(spot)).collect();
        if limit == Some(level) {
            // The limit also runs along steps.
            pieces.extend(field.steps(level).into_iter().map(|piece| piece.map(spot)));
        }
        let data: Vec<String> = pieces.iter().map(|piece| outline(piece, false)).collect();
        if !data.is_empty() {
            canvas.path(&data.concat(), None, Some(stroke));
        }
        lines.push((words, stroke.ink, pieces));
    }
    // The limit was drawn last and gets its number first.
    for (words, ink, pieces) in lines.into_iter().rev() {
        number(canvas, space, &words, ink, pieces);
    }
}

/// The number of a contour, where there is room on it: as near the middle of the map as can be.
fn number(canvas: &mut Canvas, space: &mut Space, words: &str, ink: Ink, mut pieces: Vec<[Spot; 2]>) {
    let middle = space.frame().middle();
    let distance = |piece: &[Spot; 2]| ((piece[0] + piece[1]) / 2.0 - middle).norm();
    pieces.sort_by(|a, b| distance(a).total_cmp(&distance(b)));
    for [from, to] in pieces {
        let at = (from + to) / 2.0 + Spot::new(0.0, 0.5 * font::CAPITALS * SMALL);
        let text = Text { size: SMALL, ink, anchor: Anchor::Middle, ..Text::new(words, at) };
        if space.is_free(&text.area()) {
            space.take(text.area());
            canvas.area(&text.area().grown(1.0), Some(Ink::PAPER), None);
            canvas.text(&text);
            return;
        }
    }
}

/// The shades with the levels between them.
fn legend(canvas: &mut Canvas, plot: &Plot, levels: &[f64], extent: [f64; 2], is_utilisation: bool) {
    let (left, right) = (plot.area.most.x + 14.0, plot.area.most.x + 30.0);
    let (bottom, height) = (plot.area.most.y, plot.area.size().y);
    let bands = levels.len() + 1;
    let each = height / as_float(bands);
    for band in 0..bands {
        let lower = bottom - each * as_float(band);
        let ink = shade(as_float(band) / as_float(levels.len()).max(1.0));
        canvas.area(&Area::new(left, lower - each - 0.3, right, lower), Some(ink), None);
    }
    canvas.area(&Area::new(left, bottom - height, right, bottom), None, Some(Stroke::solid(Ink::QUIET, 1.0)));
    // A utilisation is rounded up, as everywhere.
    let end = |value: f64| if is_utilisation { utilisation(value, value > LIMIT) } else { people(value) };
    let numbers = [end(extent[0])].into_iter().chain(plain(levels)).chain([end(extent[1])]);
    for (index, words) in numbers.enumerate() {
        let at = Spot::new(right + 6.0, bottom - each * as_float(index) + 0.5 * font::CAPITALS * SMALL);
        let ink = if index == 0 || index == bands { Ink::QUIET } else { Ink::TEXT };
        canvas.text(&Text { size: SMALL, ink, ..Text::new(&words, at) });
    }
}
