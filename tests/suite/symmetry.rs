//! What must not change a result, or must change it in a known way: *independent* of any expected number.
//!
//! Each property is checked on random groups (straight runs, arcs, mixed legs, fillers and sides) and all their
//! states (of one in sixteen; the first state of the rest): load factors, elastic load factor and centres transform together.

use crate::fixture::at;
use crate::laws::{LAWS, shipped};
use crate::random::{Answer, Sketch, answer, check, sketch, text};
use proptest::prelude::*;
use proptest::test_runner::TestCaseError;
use weldpole::input::{Options, read_joint};
use weldpole::model::{Discretisation, Run, Vector, WeldGroup, Wrench};
use weldpole::solvers::UltimateSettings;

/// Cases of each property.
const CASES: u32 = 200;
/// Rounding in the transformed coordinates, times the condition of the state.
const EXACT: f64 = 1e-9;
/// Centres, over the distance from the centroid and the size of the joint, both squared over the size: a centre
/// at R sizes has lost a factor R of its digits.
const CENTRE: f64 = 1e-7;

fn solve(sketch: &Sketch, welds: &WeldGroup, load: &Wrench) -> Answer {
    answer(welds, load, shipped("lesik-kennedy"), Discretisation::Continuous, sketch.search())
}

/// Compares two answers; `factor` is what the load factors must be multiplied by, `place` maps points.
fn same(
    before: &Answer,
    after: &Answer,
    factor: f64,
    place: impl Fn(Vector) -> Vector,
) -> Result<(), TestCaseError> {
    let close = |one: f64, two: f64, error: f64| {
        prop_assert!(
            (two / (one * factor) - 1.0).abs() <= EXACT + error,
            "{} becomes {}, times {}",
            one,
            two,
            factor
        );
        Ok(())
    };
    close(before.elastic.load_factor, after.elastic.load_factor, 0.0)?;
    let (old, new) = (&before.ultimate.states, &after.ultimate.states);
    prop_assert_eq!(old.len(), new.len());
    for (one, two) in old.iter().zip(new) {
        close(one.load_factor, two.load_factor, one.error_estimate + two.error_estimate)?;
        let Some([x, y]) = one.centre else { continue };
        // Of mirror twins either may come first.
        let twins = |a: f64, b: f64| (a / b - 1.0).abs() < EXACT;
        let expected = place(at(x, y));
        let reach = (at(x, y) - before.section.centroid).norm() / before.gyration + 1.0;
        let near = new
            .iter()
            .filter(|state| twins(state.load_factor, two.load_factor))
            .filter_map(|state| state.centre)
            .map(|[x, y]| (at(x, y) - expected).norm())
            .fold(f64::INFINITY, f64::min);
        prop_assert!(
            near <= CENTRE * reach * reach * after.gyration,
            "centre {:?} should become {:?}, nearest {}",
            one.centre,
            expected,
            near
        );
    }
    let ratio = |answer: &Answer| answer.ultimate.governing().load_factor / answer.elastic.load_factor;
    prop_assert!((ratio(after) / ratio(before) - 1.0).abs() <= 2.0 * EXACT);
    Ok(())
}

/// The group with every run changed, and the welds' other properties kept.
fn changed(sketch: &Sketch, change: impl Fn(&Run) -> Vec<Run>) -> WeldGroup {
    let welds = sketch.welds();
    let welds = welds.welds().iter().map(|weld| {
        let mut weld = weld.clone();
        weld.runs = weld.runs.iter().flat_map(&change).collect();
        weld
    });
    WeldGroup::new(welds.collect()).unwrap()
}

fn moved(run: &Run, by: Vector) -> Run {
    match *run {
        Run::Straight { from, to } => Run::straight(from + by, to + by).unwrap(),
        Run::Arc { centre, radius, start, sweep } => Run::arc(centre + by, radius, start, sweep).unwrap(),
    }
}

fn turn(angle: f64) -> impl Fn(Vector) -> Vector {
    let (sine, cosine) = angle.sin_cos();
    move |v: Vector| Vector::new(cosine * v.x - sine * v.y, sine * v.x + cosine * v.y, v.z)
}

fn mirror(v: Vector) -> Vector {
    Vector::new(-v.x, v.y, v.z)
}

#[test]
fn moving_the_joint_with_its_load_moves_the_centre() {
    check(CASES, &(sketch(), -1e4..1e4, -1e4..1e4), |(sketch, x, y)| {
        let by = at(x, y);
        let welds = changed(&sketch, |run| vec![moved(run, by)]);
        let load = sketch.load();
        let after = Wrench::new(load.reference + by, load.force, load.moment).unwrap();
        same(&solve(&sketch, &sketch.welds(), &load), &solve(&sketch, &welds, &after), 1.0, |place| {
            place + by
        })
    });
}

#[test]
fn turning_the_joint_with_its_load_turns_the_centre() {
    check(CASES, &(sketch(), 0.0..360.0_f64), |(sketch, degrees)| {
        let angle = degrees.to_radians();
        let turn = turn(angle);
        let welds = changed(&sketch, |run| {
            vec![match *run {
                Run::Straight { from, to } => Run::straight(turn(from), turn(to)).unwrap(),
                Run::Arc { centre, radius, start, sweep } => {
                    Run::arc(turn(centre), radius, start + angle, sweep).unwrap()
                }
            }]
        });
        let load = sketch.load();
        let after = Wrench::new(turn(load.reference), turn(load.force), load.moment).unwrap();
        same(&solve(&sketch, &sketch.welds(), &load), &solve(&sketch, &welds, &after), 1.0, &turn)
    });
}

#[test]
fn mirroring_the_joint_with_its_load_mirrors_the_centre() {
    check(CASES, &sketch(), |sketch| {
        let welds = changed(&sketch, |run| {
            vec![match *run {
                Run::Straight { from, to } => Run::straight(mirror(from), mirror(to)).unwrap(),
                Run::Arc { centre, radius, start, sweep } => {
                    Run::arc(mirror(centre), radius, std::f64::consts::PI - start, -sweep).unwrap()
                }
            }]
        });
        let load = sketch.load();
        let after = Wrench::new(mirror(load.reference), mirror(load.force), -load.moment).unwrap();
        same(&solve(&sketch, &sketch.welds(), &load), &solve(&sketch, &welds, &after), 1.0, mirror)
    });
}

#[test]
fn splitting_every_run_changes_nothing() {
    check(CASES, &(sketch(), 0.02..0.98), |(sketch, share)| {
        let welds = changed(&sketch, |run| match *run {
            Run::Straight { from, to } => {
                let middle = run.point(share);
                vec![Run::straight(from, middle).unwrap(), Run::straight(middle, to).unwrap()]
            }
            Run::Arc { centre, radius, start, sweep } => vec![
                Run::arc(centre, radius, start, sweep * share).unwrap(),
                Run::arc(centre, radius, start + sweep * share, sweep * (1.0 - share)).unwrap(),
            ],
        });
        let load = sketch.load();
        same(&solve(&sketch, &sketch.welds(), &load), &solve(&sketch, &welds, &load), 1.0, |place| place)
    });
}

#[test]
fn scaling_the_joint_and_its_legs_scales_the_strength_by_the_area() {
    check(CASES, &(sketch(), -1.0..1.0), |(sketch, power)| {
        let scale = 10.0_f64.powf(power);
        let mut larger = sketch.clone();
        for piece in &mut larger.pieces {
            piece.from = piece.from.map(|coordinate| coordinate * scale);
            piece.length *= scale;
            piece.leg *= scale;
        }
        larger.at = larger.at.map(|coordinate| coordinate * scale);
        larger.moment *= scale;
        let (before, after) = (
            solve(&sketch, &sketch.welds(), &sketch.load()),
            solve(&sketch, &larger.welds(), &larger.load()),
        );
        same(&before, &after, scale * scale, |place| place * scale)
    });
}

#[test]
fn reversing_every_path_changes_nothing() {
    check(CASES, &sketch(), |sketch| {
        let welds = changed(&sketch, |run| {
            vec![match *run {
                Run::Straight { from, to } => Run::straight(to, from).unwrap(),
                Run::Arc { centre, radius, start, sweep } => {
                    Run::arc(centre, radius, start + sweep, -sweep).unwrap()
                }
            }]
        });
        let load = sketch.load();
        same(&solve(&sketch, &sketch.welds(), &load), &solve(&sketch, &welds, &load), 1.0, |place| place)
    });
}

#[test]
fn the_order_of_the_welds_does_not_matter() {
    check(CASES, &(sketch(), 1_usize..4), |(sketch, by)| {
        let mut other = sketch.clone();
        let count = other.pieces.len();
        other.pieces.rotate_left(by % count);
        other.pieces.reverse();
        let load = sketch.load();
        same(&solve(&sketch, &sketch.welds(), &load), &solve(&sketch, &other.welds(), &load), 1.0, |place| {
            place
        })
    });
}

#[test]
fn scaling_the_load_scales_the_load_factor_back() {
    check(CASES, &(sketch(), -6.0..6.0), |(sketch, power)| {
        let factor = 10.0_f64.powf(power);
        let load = sketch.load();
        let welds = sketch.welds();
        same(
            &solve(&sketch, &welds, &load),
            &solve(&sketch, &welds, &load.scaled(factor)),
            1.0 / factor,
            |place| place,
        )
    });
}

#[test]
fn the_opposite_load_has_the_same_strength_and_centre() {
    check(CASES, &sketch(), |sketch| {
        let load = sketch.load();
        let welds = sketch.welds();
        same(&solve(&sketch, &welds, &load), &solve(&sketch, &welds, &load.scaled(-1.0)), 1.0, |place| place)
    });
}

#[test]
fn every_law_and_the_elements_know_the_same_symmetries() {
    check(CASES, &(sketch(), 0..LAWS.len(), any::<bool>()), |(sketch, law, elements)| {
        // Some loads on rigid-plastic elements have no state (see `elements`).
        let elements = elements && LAWS[law] != "rigid-plastic";
        let discretisation = if elements { Discretisation::Elements(30) } else { Discretisation::Continuous };
        let solve = |welds: &WeldGroup, load: &Wrench| {
            answer(welds, load, shipped(LAWS[law]), discretisation, sketch.search())
        };
        let welds = changed(&sketch, |run| {
            vec![match *run {
                Run::Straight { from, to } => Run::straight(mirror(to), mirror(from)).unwrap(),
                Run::Arc { centre, radius, start, sweep } => {
                    Run::arc(mirror(centre), radius, std::f64::consts::PI - start - sweep, sweep).unwrap()
                }
            }]
        });
        let load = sketch.load();
        let after = Wrench::new(mirror(load.reference), mirror(load.force), -load.moment).unwrap();
        same(&solve(&sketch.welds(), &load), &solve(&welds, &after.scaled(-2.0)), 0.5, mirror)
    });
}

#[test]
fn metric_and_us_files_give_the_same_answers() {
    check(CASES, &sketch(), |sketch| {
        // Exact: 1 in = 25.4 mm, 1 kip = 4448.2216152605 N.
        let (inch, kip) = (25.4, 4_448.221_615_260_5);
        let read = |text: &str| {
            let joint = read_joint("random.toml", text, &Options::default());
            joint.unwrap_or_else(|faults| panic!("{faults:?} in\n{text}"))
        };
        let (metric, us) =
            (read(&text(&sketch, "metric", 1.0, 1000.0)), read(&text(&sketch, "us", inch, kip)));
        let of = |joint: &weldpole::model::Joint| solve(&sketch, &joint.group, &joint.cases[0].wrench);
        same(&solve(&sketch, &sketch.welds(), &sketch.load()), &of(&metric), 1.0, |place| place)?;
        same(&of(&metric), &of(&us), 1.0, |place| place)?;
        let settings =
            UltimateSettings { search: sketch.search(), path: false, ..UltimateSettings::default() };
        let report = weldpole::analysis::analyse_with(&us, &settings);
        let strength = report.cases[0].ultimate().unwrap().governing().load_factor;
        prop_assert!((strength / of(&metric).ultimate.governing().load_factor - 1.0).abs() < EXACT);
        Ok(())
    });
}
