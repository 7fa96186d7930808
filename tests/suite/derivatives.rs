//! Tangents against finite differences, and a user's table law against the laws it is sampled from.
//!
//! Expected values are *independent*: differences of the function itself, or the law behind the table.

use crate::fixture::{at, group};
use crate::laws::{LAWS, limit, shipped, strength};
use crate::random::{answer, check, sketch};
use crate::shapes;
use proptest::prelude::*;
use std::cell::Cell;
use weldpole::mechanics::{PlaneGroup, Quadrature, Triple};
use weldpole::model::{
    Confirmation, Discretisation, Law, LawForm, TableCurve, TableLaw, Vector, WeldGroup, Wrench,
};
use weldpole::solvers::Search;

const CASES: u32 = 120;
/// Step over the size of the motion.
const STEP: f64 = 1e-4;
/// Fourth-order central differences at that step leave 1e-12 of rounding and 1e-7 of truncation where the centre is
/// a tenth of the group away from the weld; quadrature that moves with the motion leaves 1e-8.
const DIFFERENCE: f64 = 1e-5;

/// Fourth-order central difference in each component of the motion.
fn gradient<T: Copy + std::ops::Mul<f64, Output = T> + std::ops::Add<Output = T>>(
    q: &Triple,
    f: impl Fn(&Triple) -> T,
) -> [T; 3] {
    let step = STEP * q.norm();
    [Triple::x(), Triple::y(), Triple::z()].map(|axis| {
        let at = |times: f64| f(&(q + axis * (times * step)));
        (at(1.0) * 8.0 + at(-1.0) * -8.0 + at(-2.0) + at(2.0) * -1.0) * (1.0 / (12.0 * step))
    })
}

/// Least distance from the centre to a weld over the gyration radius for a case to count as smooth: nearer, the
/// curvature outgrows the step.
const FAR_ENOUGH: f64 = 0.1;

fn smooth(plane: &PlaneGroup, q: &Triple) -> bool {
    plane.pieces.iter().all(|piece| {
        let (low, high) = piece.range();
        (0..=200).all(|k| {
            let (at, _) = piece.frame(low + (high - low) * f64::from(k) / 200.0);
            weldpole::mechanics::displacement(q, &at).norm() > FAR_ENOUGH * q.z.abs()
        })
    })
}

#[test]
fn tangents_are_the_differences_of_their_functions() {
    let (tangents, gradients) = (Cell::new(0), Cell::new(0));
    let motion = [-1.0..1.0, -1.0..1.0, -1.0..1.0];
    check(CASES, &(sketch(), motion, 0..LAWS.len(), any::<bool>()), |(sketch, motion, law, elements)| {
        let discretisation = if elements { Discretisation::Elements(25) } else { Discretisation::Continuous };
        let plane = PlaneGroup::new(&sketch.welds(), shipped(LAWS[law]), 0.60, discretisation);
        let q = Triple::from(motion);
        let Some(utmost) = plane.utmost(&q) else { return Ok(()) };
        if !smooth(&plane, &q) {
            return Ok(());
        }
        let q = q / utmost.ratio;
        let quadrature = Quadrature::fine(16);
        // The polynomial law jumps by 0.5 % at p = 0.0325, and an element on either side of it has no difference.
        if !(elements && LAWS[law] == "lesik-kennedy-polynomial") {
            let own = plane.resultant(&q, &quadrature).tangent;
            let columns = gradient(&q, |q| plane.resultant(q, &quadrature).wrench);
            for (k, column) in columns.iter().enumerate() {
                let gap = (own.column(k) - column).norm();
                prop_assert!(
                    gap <= DIFFERENCE * own.norm(),
                    "{}: column {}, {} of {}",
                    LAWS[law],
                    k,
                    gap,
                    own.norm()
                );
            }
            tangents.set(tangents.get() + 1);
        }
        // Away from kinks: the same place decides all around.
        let utmost = plane.utmost(&q).unwrap();
        let corners =
            [Triple::x(), Triple::y(), Triple::z()].into_iter().flat_map(|axis| [axis * 1.0, axis * -1.0]);
        let around = corners.map(|way| plane.utmost(&(q + way * (2.0 * STEP * q.norm()))).unwrap());
        let steady = |near: weldpole::mechanics::Utmost| {
            near.piece == utmost.piece && (near.at - utmost.at).norm() < 0.02
        };
        if around.into_iter().all(steady) {
            let own = utmost.gradient;
            let difference = Triple::from(gradient(&q, |q| plane.utmost(q).unwrap().ratio));
            // Interior maxima are closed in on to 1e-14 of the ratio: 1e-10 over the step.
            let gap = (own - difference).norm();
            prop_assert!(gap <= DIFFERENCE * own.norm(), "{}: {:?}, {:?}", LAWS[law], own, difference);
            // Homogeneous of degree one.
            prop_assert!((own.dot(&q) / utmost.ratio - 1.0).abs() < 1e-9);
            gradients.set(gradients.get() + 1);
        }
        Ok(())
    });
    println!("{} tangents and {} gradients of {CASES} motions", tangents.get(), gradients.get());
    assert!(tangents.get() >= 40 && gradients.get() >= 50);
}

fn table(curves: Vec<TableCurve>) -> Law {
    Law {
        id: "own".into(),
        title: "own".into(),
        source: "tests".into(),
        status: Confirmation::Read,
        form: LawForm::Table(TableLaw::new(curves).unwrap()),
    }
}

/// The simplified curve sampled at 49 angles, theta + 6 in a geometric row, and at 40 deformations each, crowded
/// toward zero.
fn sampled() -> Law {
    let angles = (0..=48).map(|k| (6.0 * 16.0_f64.powf(f64::from(k) / 48.0) - 6.0).clamp(0.0, 90.0));
    let curve = |angle: f64| {
        let most = limit("lesik-kennedy", angle);
        let point = |k: u32| {
            let deformation = most * (f64::from(k) / 40.0).powi(3);
            [deformation, strength("lesik-kennedy", angle, deformation)]
        };
        TableCurve { angle, points: (0..=40).map(point).collect() }
    };
    table(angles.map(curve).collect())
}

/// Straight lines between 41 points on f lie up to 1e-3 below it; the limits between angles 5e-4 above theirs.
const SAMPLING: f64 = 1.5e-3;

#[test]
fn a_table_sampled_from_a_law_reproduces_it() {
    let law = sampled();
    for (shape, k, a, angle) in
        [("c", 0.5, 0.875, 0.0), ("two-lines", 0.5, 0.4, 30.0), ("line", 0.0, 0.5, 0.0)]
    {
        let welds = group(shapes::runs(shape, k, 200.0), 6.0);
        let load = shapes::load(&welds, a, 200.0, angle, 1000.0);
        let solve = |law: &Law| {
            let answer = answer(&welds, &load, law, Discretisation::Continuous, Search::First);
            answer.ultimate.governing().load_factor
        };
        let (own, exact) = (solve(&law), solve(shipped("lesik-kennedy")));
        println!("{shape}: table over law {:+.1e}", own / exact - 1.0);
        assert!((own / exact - 1.0).abs() < SAMPLING, "{shape}: {own} against {exact}");
    }
}

/// One curve for all directions, force through the centroid: every point moves alike and pulls alike, whatever the
/// shape, so R_n = 0.60 F t L g(rupture).
#[test]
fn a_direction_blind_table_translates_by_its_closed_form() {
    let points = vec![[0.0, 0.0], [0.05, 0.8], [0.1, 1.1], [0.2, 0.9]];
    let law = table(vec![TableCurve { angle: 0.0, points }]);
    for (shape, length) in [("c", 400.0), ("l", 300.0), ("two-lines", 400.0)] {
        let welds = group(shapes::runs(shape, 0.5, 200.0), 6.0);
        let expected = 0.60 * 490.0 * 6.0 * std::f64::consts::FRAC_1_SQRT_2 * length * 0.9;
        for degrees in [0.0, 40.0, 90.0] {
            let load = shapes::load(&welds, 0.0, 200.0, degrees, 1000.0);
            let answer = answer(&welds, &load, &law, Discretisation::Continuous, Search::First);
            let own = answer.ultimate.governing().load_factor * 1000.0;
            assert!((own / expected - 1.0).abs() < 1e-9, "{shape}, {degrees}: {own} against {expected}");
        }
    }
    // A pure moment: the farthest point is at 0.9, and the moment is the integral of g(0.2 r / r_max) r.
    let line: WeldGroup = group(shapes::runs("line", 0.0, 200.0), 6.0);
    let moment = Wrench::new(at(0.0, 0.0), Vector::zeros(), Vector::new(0.0, 0.0, 1e6)).unwrap();
    let answer = answer(&line, &moment, &law, Discretisation::Continuous, Search::First);
    // Shares of the half length: g = 3.2 s to s = 1/4, 0.5 + 1.2 s to 1/2, 1.3 - 0.4 s to 1. Twice the integral of g s.
    let part = |constant: f64, slope: f64, low: f64, high: f64| {
        constant * (high * high - low * low) / 2.0 + slope * (high.powi(3) - low.powi(3)) / 3.0
    };
    let integral = part(0.0, 3.2, 0.0, 0.25) + part(0.5, 1.2, 0.25, 0.5) + part(1.3, -0.4, 0.5, 1.0);
    let expected = 0.60 * 490.0 * 6.0 * std::f64::consts::FRAC_1_SQRT_2 * 2.0 * 100.0 * 100.0 * integral;
    let own = answer.ultimate.governing().load_factor * 1e6;
    assert!((own / expected - 1.0).abs() < 1e-9, "{own} against {expected}");
}
