//! Where the ultimate strength jumps between neighbouring points.
//!
//! The reported strength is the smallest of the equilibrium states at first rupture. Where a state appears or
//! vanishes (a fold), the smallest can change at once: a jump, which a line through points would hide.
//!
//! An interval between neighbours is suspicious when their numbers of states differ, a search was incomplete, or
//! its change of `ln R` is out of proportion (of few intervals: notable); with one variable also when one
//! end has several states. It is halved again and again, keeping the half of larger change. After n halvings a
//! continuous strength leaves `2^-n` of the whole change, and `2^(-n/2)` at the vertical tangent of a fold; a
//! jump leaves itself.
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | R | `strength` | N, N mm | nominal ultimate strength as the size of the load, finite also for no load |
//! | n | `halvings` | - | halvings made |
//!
//! Limits: of several jumps within one interval the one is located that the larger changes lead to; jumps of
//! less than [`SMALLEST`] are not told apart from a steep curve; neighbours of equal strength and number of
//! states are not searched between.

use super::solve::Task;
use super::{Point, PointCase};
use crate::analysis::Demand;

/// Halvings with one variable: a step is located to a millionth of it.
const HALVINGS: usize = 20;
/// Halvings with two variables, of which there are many more intervals.
const HALVINGS_OF_TWO: usize = 8;
/// Smallest jump of `ln R` that is reported: below the accuracy of any weld's strength.
const SMALLEST: f64 = 1e-3;
/// A jump must leave this many times what the tangent of a fold leaves.
const BEYOND_A_FOLD: f64 = 4.0;
/// Halvings before an interval of small change is given up: before, a jump may hide behind an opposite slope.
const FIRST_HALVINGS: usize = 4;
/// A change this many times the median is out of proportion,
const OUT_OF_PROPORTION: f64 = 5.0;
/// if it also exceeds this.
const NOTABLE: f64 = 0.01;
/// Intervals up to which a median says nothing: every notable change is looked into.
const FEW_INTERVALS: usize = 6;

/// A jump of the ultimate strength of the shown case.
#[derive(Debug, Clone, PartialEq)]
pub struct Jump {
    /// Index of the variable along which the points are neighbours.
    pub variable: usize,
    /// The points on both sides, by index.
    pub points: [usize; 2],
    /// Values of the variable on both sides of the jump, inside units, as near as it was located.
    pub at: [f64; 2],
    /// Nominal load factors there.
    pub load_factor: [f64; 2],
    /// Nominal strengths there, as sizes of the load.
    pub strength: [Demand; 2],
}

impl Jump {
    /// Change of the strength from the first side to the second, over the first.
    #[must_use]
    pub fn relative_change(&self) -> f64 {
        self.strength[1].size / self.strength[0].size - 1.0
    }
}

/// One side of an interval.
#[derive(Debug, Clone, Copy)]
struct Side {
    at: f64,
    load_factor: f64,
    strength: Demand,
}

impl Side {
    fn new(point: &Point, shown: usize, variable: usize) -> Option<Self> {
        let case = shown_case(point, shown)?;
        let (strength, demand) = (case.ultimate?, case.demand?);
        let load_factor = strength.load_factor;
        let strength = Demand { size: demand.size * load_factor, ..demand };
        Some(Self { at: *point.values.get(variable)?, load_factor, strength })
    }
}

/// An interval that may hold a jump.
#[derive(Debug, Clone)]
struct Interval {
    variable: usize,
    points: [usize; 2],
    sides: [Side; 2],
    /// Change of `ln R` between the points.
    whole: f64,
}

fn change(sides: &[Side; 2]) -> f64 {
    (sides[1].strength.size / sides[0].strength.size).ln().abs()
}

fn shown_case(point: &Point, shown: usize) -> Option<&PointCase> {
    point.outcome.as_ref().ok()?.cases.get(shown)
}

/// The jumps of the case `shown`, along the first variable first, each in the order of the points. `progress` hears
/// the number of all analyses so far, those of the points included.
pub(super) fn find(
    task: &Task<'_>,
    points: &[Point],
    shown: usize,
    progress: &(dyn Fn(usize) + Sync),
) -> Vec<Jump> {
    let mut analysed = points.len();
    let halvings = if task.variables.len() == 1 { HALVINGS } else { HALVINGS_OF_TWO };
    let mut open: Vec<Interval> =
        (0..task.variables.len()).flat_map(|variable| suspicious(task, points, shown, variable)).collect();
    for made in 1..=halvings {
        let middles: Vec<Vec<f64>> =
            open.iter().map(|interval| middle(interval, &points[interval.points[0]])).collect();
        let solved = task.solve(&middles, &|done| progress(analysed + done));
        analysed += middles.len();
        open = open
            .into_iter()
            .zip(&solved)
            .filter_map(|(interval, middle)| halved(interval, middle, shown))
            .filter(|interval| made < FIRST_HALVINGS || change(&interval.sides) > SMALLEST)
            .collect();
    }
    #[allow(clippy::cast_precision_loss)] // a handful
    let left_by_a_fold = 0.5_f64.powf(halvings as f64 / 2.0);
    let is_jump = |interval: &Interval| {
        let left = change(&interval.sides);
        left > SMALLEST && left > BEYOND_A_FOLD * left_by_a_fold * interval.whole
    };
    open.into_iter().filter(is_jump).map(Jump::from).collect()
}

impl From<Interval> for Jump {
    fn from(interval: Interval) -> Self {
        let sides = interval.sides;
        Self {
            variable: interval.variable,
            points: interval.points,
            at: sides.map(|side| side.at),
            load_factor: sides.map(|side| side.load_factor),
            strength: sides.map(|side| side.strength),
        }
    }
}

/// The intervals along one variable that may hold a jump.
fn suspicious(task: &Task<'_>, points: &[Point], shown: usize, variable: usize) -> Vec<Interval> {
    let intervals: Vec<Interval> = pairs(task, variable)
        .into_iter()
        .filter_map(|pair| {
            let [a, b] = pair.map(|index| Side::new(&points[index], shown, variable));
            let sides = [a?, b?];
            // A force and a moment cannot be compared.
            if sides[0].strength.in_moment != sides[1].strength.in_moment {
                return None;
            }
            Some(Interval { variable, points: pair, whole: change(&sides), sides })
        })
        .collect();
    let mut changes: Vec<f64> = intervals.iter().map(|interval| interval.whole).collect();
    changes.sort_by(f64::total_cmp);
    let median = changes.get(changes.len() / 2).copied().unwrap_or(0.0);
    let proportion = if changes.len() > FEW_INTERVALS { OUT_OF_PROPORTION * median } else { 0.0 };
    let alone = task.variables.len() == 1;
    let is_suspicious = |interval: &Interval| {
        let cases = interval.points.map(|index| shown_case(&points[index], shown));
        let states = cases.map(|case| case.map_or(0, |case| case.states));
        let incomplete = cases.iter().flatten().any(|case| case.incomplete);
        let steep = interval.whole > NOTABLE.max(proportion);
        states[0] != states[1] || incomplete || steep || (alone && states[0].max(states[1]) > 1)
    };
    intervals.into_iter().filter(is_suspicious).collect()
}

/// Neighbours along one variable.
fn pairs(task: &Task<'_>, variable: usize) -> Vec<[usize; 2]> {
    let lengths: Vec<usize> = task.variables.iter().map(|variable| variable.values.len()).collect();
    let step: usize = lengths.iter().skip(variable + 1).product();
    let all: usize = lengths.iter().product();
    let last = |index: usize| index / step % lengths[variable] + 1 == lengths[variable];
    (0..all).filter(|index| !last(*index)).map(|index| [index, index + step]).collect()
}

/// The values in the middle of an interval.
fn middle(interval: &Interval, beside: &Point) -> Vec<f64> {
    let mut values = beside.values.clone();
    let [from, to] = interval.sides.map(|side| side.at);
    values[interval.variable] = from + 0.5 * (to - from);
    values
}

/// The half of larger change; `None` where the middle has no answer or cannot be told from the ends.
fn halved(interval: Interval, middle: &Point, shown: usize) -> Option<Interval> {
    let middle = Side::new(middle, shown, interval.variable)?;
    if middle.strength.in_moment != interval.sides[0].strength.in_moment {
        return None;
    }
    let [first, second] = [[interval.sides[0], middle], [middle, interval.sides[1]]];
    let sides = if change(&first) > change(&second) { first } else { second };
    Some(Interval { sides, ..interval })
}
