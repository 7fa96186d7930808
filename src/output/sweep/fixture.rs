//! Hand-built sweeps for the tests of the writers: a jump, a fault, a point without load, another case governing.
//!
//! The numbers are made up to be told apart in the output.

use crate::analysis::{Demand, Status, Strength, Verification};
use crate::model::{Basis, Joint};
use crate::output::fixture;
use crate::study::sweep::{Answer, Jump, Point, PointCase, Sweep, Target, Variable};

/// The hand-built joint with these cases.
pub(super) fn joint() -> Joint {
    fixture::report(vec![fixture::case("crane", 1.25)], Some(0)).joint
}

fn case(load_factor: f64, in_moment: bool) -> PointCase {
    let strength =
        |factor: f64| Some(Strength { load_factor: factor, design_load_factor: Some(0.75 * factor) });
    let utilisation = 1.0 / (0.75 * load_factor);
    PointCase {
        status: if utilisation > 1.0 { Status::Exceeded } else { Status::Satisfied },
        demand: Some(Demand { size: if in_moment { 2e6 } else { 50e3 }, in_moment }),
        ultimate: strength(load_factor),
        elastic: strength(1.0),
        peak_load_factor: Some(load_factor + 0.25),
        states: 1,
        incomplete: false,
        centre: Some([1.0, 2.0]),
        verification: Some(Verification {
            basis: Basis::Ultimate,
            check: "instantaneous-centre".into(),
            utilisation,
        }),
        not_solved: None,
    }
}

fn unloaded() -> PointCase {
    PointCase {
        status: Status::Satisfied,
        demand: None,
        ultimate: None,
        elastic: None,
        peak_load_factor: None,
        states: 0,
        incomplete: false,
        centre: None,
        verification: None,
        not_solved: None,
    }
}

fn variable(name: &str, given: Option<f64>, values: Vec<f64>) -> Variable {
    Variable {
        name: name.into(),
        target: if given.is_some() { Target::Parameter } else { Target::LoadEccentricity },
        unit: "mm".into(),
        factor: 1.0,
        inside_unit: "mm".into(),
        given,
        values,
    }
}

fn point(values: Vec<f64>, cases: Vec<PointCase>, governing: usize) -> Point {
    Point { values, outcome: Ok(Answer { cases, governing: Some(governing), breached: false }) }
}

/// Five values of one parameter, two cases; the shown one jumps between the second and the third.
pub(super) fn curve() -> Sweep {
    let values: Vec<f64> = vec![0.0, 12.5, 25.0, 37.5, 50.0];
    let several = PointCase { states: 3, incomplete: true, peak_load_factor: None, ..case(1.6, false) };
    let twist = || case(3.0, true);
    let points = vec![
        Point { values: vec![0.0], outcome: Err(vec![fixture::fault()]) },
        point(vec![12.5], vec![case(2.0, false), twist()], 0),
        point(vec![25.0], vec![several, twist()], 0),
        point(vec![37.5], vec![unloaded(), twist()], 1),
        point(vec![50.0], vec![case(0.8, false), twist()], 0),
    ];
    let strength = |factor: f64| Demand { size: 50e3 * factor, in_moment: false };
    let jump = Jump {
        variable: 0,
        points: [1, 2],
        at: [17.123_4, 17.123_5],
        load_factor: [1.9, 1.65],
        strength: [strength(1.9), strength(1.65)],
    };
    Sweep {
        joint: joint(),
        variables: vec![variable("arm", Some(20.0), values)],
        cases: vec!["crane".into(), "twist".into()],
        shown: 0,
        points,
        jumps: vec![jump],
    }
}

/// Two variables of `columns` values in two rows.
pub(super) fn plane(columns: u32) -> Sweep {
    let values: Vec<f64> = (0..columns).map(|index| 10.0 * f64::from(index)).collect();
    let row = |arm: f64| {
        values.iter().map(move |e| point(vec![arm, *e], vec![case(1.0 + 0.01 * (arm - e), false)], 0))
    };
    let points = row(25.0).chain(row(50.0)).collect();
    let variables = vec![
        variable("arm", Some(20.0), vec![25.0, 50.0]),
        variable("load.eccentricity", None, values.clone()),
    ];
    Sweep { joint: joint(), variables, cases: vec!["crane".into()], shown: 0, points, jumps: Vec::new() }
}
