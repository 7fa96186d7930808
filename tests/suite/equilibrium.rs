//! Every answer put to the proof: *independent* sums over points, with the laws of `laws`.

use crate::laws::{LAWS, limit, shipped, strength};
use crate::random::{Sketch, answer, check, sketch};
use crate::reference::Honesty;
use proptest::prelude::*;
use std::cell::RefCell;
use weldpole::mechanics::PlaneGroup;
use weldpole::model::{Discretisation, Run, Vector, WeldGroup};
use weldpole::solvers::{Motion, Search, UltimateSettings, UltimateSolver};

const CASES: u32 = 300;
/// Points on each run of the sum below.
const POINTS: u32 = 3000;
/// A mid-point sum of that many points over a kink and a root: about 1e-5, 1e-3 asked.
const SUM: f64 = 1e-3;
/// What the solver promises of its own residual.
const RESIDUAL: f64 = 1e-9;
/// Sampling misses the peak of |u| / Delta_u on an arc, which can be a ridge, by a part of a sample.
const SAMPLED: f64 = 5e-3;

/// Displacement and the angle to the weld axis (degrees) at a share of a run.
fn kinematics(run: &Run, share: f64, motion: &Motion, centroid: Vector) -> (Vector, Vector, f64) {
    let lever = run.point(share) - centroid;
    let u = Vector::new(
        motion.translation[0] - motion.rotation * lever.y,
        motion.translation[1] + motion.rotation * lever.x,
        0.0,
    );
    let along = u.dot(&run.tangent(share)).abs();
    let across = u.cross(&run.tangent(share)).norm();
    (lever, u, across.atan2(along).to_degrees())
}

/// Force and moment about the centroid by plain summation, and the largest deformation over its limit.
fn summed(welds: &WeldGroup, id: &str, motion: &Motion, centroid: Vector) -> (Vector, f64, f64) {
    let (mut force, mut moment, mut utmost) = (Vector::zeros(), 0.0, 0.0_f64);
    for weld in welds.welds() {
        let leg = weld.size.leg().unwrap();
        let per_length = 0.60 * weld.filler.strength * weld.size.throat() * f64::from(weld.sides);
        for run in &weld.runs {
            let part = run.length() / f64::from(POINTS);
            for k in 0..POINTS {
                let share = (f64::from(k) + 0.5) / f64::from(POINTS);
                let (lever, u, theta) = kinematics(run, share, motion, centroid);
                let pull = u.normalize() * (per_length * strength(id, theta, u.norm() / leg) * part);
                force += pull;
                moment += lever.cross(&pull).z;
                utmost = utmost.max(u.norm() / (leg * limit(id, theta)));
            }
            for end in [0.0, 1.0] {
                let (_, u, theta) = kinematics(run, end, motion, centroid);
                utmost = utmost.max(u.norm() / (leg * limit(id, theta)));
            }
        }
    }
    (force, moment, utmost)
}

#[test]
fn every_answer_is_in_equilibrium_at_first_rupture() {
    let count = RefCell::new([0_usize; LAWS.len()]);
    check(CASES, &(sketch(), 0..LAWS.len()), |(sketch, law)| {
        let (welds, load, id) = (sketch.welds(), sketch.load(), LAWS[law]);
        let answer = answer(&welds, &load, shipped(id), Discretisation::Continuous, sketch.search());
        let load = load.about(answer.section.centroid);
        for state in &answer.ultimate.states {
            prop_assert!(state.load_factor > 0.0);
            prop_assert!(state.residual <= RESIDUAL, "residual {}", state.residual);
            let (force, moment, utmost) = summed(&welds, id, &state.motion, answer.section.centroid);
            let target = load.scaled(state.load_factor);
            let gap = (force - target.force).norm().hypot((moment - target.moment.z) / answer.gyration);
            let size = target.force.norm().hypot(target.moment.z / answer.gyration);
            prop_assert!(gap <= SUM * size, "{}: {} of {}", id, gap, size);
            if id != "rigid-plastic" {
                prop_assert!((1.0 - SAMPLED..=1.0 + 1e-9).contains(&utmost), "{}: utmost {}", id, utmost);
            }
            count.borrow_mut()[law] += 1;
        }
        Ok(())
    });
    println!("states by law: {:?}", count.borrow());
    assert!(count.borrow().iter().all(|states| *states >= 40));
}

#[test]
fn error_estimates_are_honest_on_random_groups() {
    let honesty = RefCell::new(Honesty::default());
    let unanswered = RefCell::new(0);
    check(4 * CASES, &(sketch(), 0..LAWS.len()), |(sketch, law): (Sketch, usize)| {
        let welds = sketch.welds();
        let plane = PlaneGroup::new(&welds, shipped(LAWS[law]), 0.60, Discretisation::Continuous);
        let settings = UltimateSettings { path: false, search: Search::First, ..UltimateSettings::default() };
        let solve = |settings| UltimateSolver::new(&plane, settings).solve(&plane.triple(&sketch.load()));
        let own = solve(settings.clone()).unwrap();
        match solve(UltimateSettings { tolerance: 1e-12, ..settings }) {
            Ok(better) => {
                let (own, better) = (own.governing(), better.governing());
                let error = (own.load_factor / better.load_factor - 1.0).abs();
                honesty.borrow_mut().note(error, own.error_estimate);
            }
            Err(_) => *unanswered.borrow_mut() += 1,
        }
        Ok(())
    });
    println!("{} of {} do not reach 1e-12", unanswered.borrow(), 4 * CASES);
    assert!(*unanswered.borrow() <= CASES / 10);
    honesty.take().judge("a solve to 1e-12 on random groups");
}
