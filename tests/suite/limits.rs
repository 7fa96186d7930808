//! Limits in which the answer is known: closed forms, and integrals over one variable.
//!
//! Expected values are *independent*: they use `laws` (the formulas written out once more) and the
//! double-exponential rule below, nothing of the library.

use crate::fixture::{at, group, straight, weld};
use crate::laws::{LAWS, limit, shipped, strength};
use crate::random::{Answer, answer};
use crate::shapes;
use std::f64::consts::{FRAC_PI_2, FRAC_PI_4, SQRT_2, TAU};
use weldpole::input::{Options, read_joint};
use weldpole::model::{Discretisation, Law, Run, Vector, WeldGroup, Wrench};
use weldpole::solvers::Search;

/// The solver's tolerance; its error estimates stay below it.
const SOLVER: f64 = 1e-9;
/// 0.60 F t for a 6 mm leg of 490 MPa, N/mm.
const PER_LENGTH: f64 = 0.60 * 490.0 * 6.0 / SQRT_2;
const LEG: f64 = 6.0;

fn load(point: [f64; 2], force: [f64; 2], moment: f64) -> Wrench {
    Wrench::new(at(point[0], point[1]), at(force[0], force[1]), Vector::new(0.0, 0.0, moment)).unwrap()
}

fn solve_by(welds: &WeldGroup, load: &Wrench, law: &Law) -> Answer {
    answer(welds, load, law, Discretisation::Continuous, Search::All)
}

fn solve(welds: &WeldGroup, load: &Wrench) -> Answer {
    solve_by(welds, load, shipped("lesik-kennedy"))
}

fn factor(welds: &WeldGroup, load: &Wrench) -> f64 {
    solve(welds, load).ultimate.governing().load_factor
}

fn ring(radius: f64) -> WeldGroup {
    group(vec![Run::arc(at(12.0, -7.0), radius, 0.4, TAU).unwrap()], LEG)
}

/// Double-exponential rule of Takahasi and Mori: exact to 1e-13 for root singularities at the ends.
fn integral(f: impl Fn(f64) -> f64, low: f64, high: f64) -> f64 {
    let step = 1.0 / 64.0;
    (-230..=230)
        .map(|k| {
            let t = step * f64::from(k);
            let inner = FRAC_PI_2 * t.sinh();
            // Distance from the nearer end, without cancellation.
            let share = 1.0 / (1.0 + (2.0 * inner.abs()).exp());
            let place = if t < 0.0 { low + (high - low) * share } else { high - (high - low) * share };
            let weight = FRAC_PI_2 * t.cosh() / inner.cosh().powi(2) * 0.5 * (high - low) * step;
            if weight > 0.0 { weight * f(place) } else { 0.0 }
        })
        .sum()
}

/// The solver has a state of this load factor, and its smallest is not above it.
fn has_state(answer: &Answer, expected: f64, what: &str) {
    let states = &answer.ultimate.states;
    let near =
        states.iter().map(|state| (state.load_factor / expected - 1.0).abs()).fold(f64::INFINITY, f64::min);
    let all: Vec<f64> = states.iter().map(|state| state.load_factor).collect();
    assert!(near <= SOLVER, "{what}: {expected} is not among {all:?}");
    assert!(answer.ultimate.governing().load_factor <= expected * (1.0 + SOLVER), "{what}");
}

#[test]
fn the_rule_of_these_tests_integrates_roots() {
    assert!((integral(|x| x.powf(0.3), 0.0, 2.0) / (2.0_f64.powf(1.3) / 1.3) - 1.0).abs() < 1e-13);
    assert!((integral(f64::sin, 0.0, FRAC_PI_2) - 1.0).abs() < 1e-13);
}

/// A ring that turns about its centre moves along itself everywhere: theta = 0, |u| = Delta_u(0), so every point
/// carries 0.60 F t f(p_u), p_u = Delta_u(0) / Delta_m(0) (0.17 / 0.1674 with the cap), at the lever R:
/// M = 0.60 F t f(p_u) 2 pi R^2.
#[test]
fn pure_moment_on_a_ring() {
    let radius = 55.0;
    for id in LAWS {
        for sign in [1.0, -1.0] {
            let g = strength(id, 0.0, limit(id, 0.0).min(1.0));
            let moment = PER_LENGTH * g * TAU * radius * radius;
            // The polynomial law has, beside this state, others about centres off the middle; turned round the ring
            // they are a continuum, of which a search for all states lists thousands. One is asked for here.
            let search = if id == "lesik-kennedy-polynomial" { Search::First } else { Search::All };
            let load = load([300.0, 20.0], [0.0, 0.0], sign * 1e6);
            let answer = answer(&ring(radius), &load, shipped(id), Discretisation::Continuous, search);
            has_state(&answer, moment / 1e6, id);
            let [x, y] = answer.ultimate.governing().centre.unwrap();
            assert!((x - 12.0).hypot(y + 7.0) < 1e-6 * radius, "{id}: centre {x}, {y}");
        }
    }
    // With the cap rupture lies close to the summit of the curve.
    let p: f64 = 0.17 / (0.209 * 2.0_f64.powf(-0.32));
    assert_eq!(format!("{p:.4}"), "1.0154");
}

/// A ring pushed through its centre moves everywhere by Delta_u(90), the smallest limit of the angles it meets:
/// R_n = 4 x 0.60 F t R x integral of g(theta, Delta_u(90)) over 0..pi/2.
#[test]
fn force_through_the_centre_of_a_ring() {
    let radius = 40.0;
    for id in LAWS {
        let d = limit(id, 90.0).min(1.0);
        let quarter = integral(|theta| strength(id, theta.to_degrees(), d), 0.0, FRAC_PI_2);
        let expected = 4.0 * PER_LENGTH * radius * quarter;
        for degrees in [0.0, 33.0, 170.0_f64] {
            let (sine, cosine) = degrees.to_radians().sin_cos();
            let answer = solve_by(
                &ring(radius),
                &load([12.0, -7.0], [1000.0 * cosine, 1000.0 * sine], 0.0),
                shipped(id),
            );
            has_state(&answer, expected / 1000.0, id);
        }
    }
}

/// A ring has no direction, and its quarters are the ring.
#[test]
fn an_eccentric_force_on_a_ring_may_come_from_anywhere() {
    let strength = |welds: &WeldGroup, degrees: f64| {
        let (sine, cosine) = f64::to_radians(degrees).sin_cos();
        let point = [12.0 + 90.0 * cosine, -7.0 + 90.0 * sine];
        factor(welds, &load(point, [-800.0 * sine, 800.0 * cosine], 0.0))
    };
    let whole = strength(&ring(40.0), 0.0);
    for degrees in [17.0, 90.0, 211.0] {
        assert!((strength(&ring(40.0), degrees) / whole - 1.0).abs() <= SOLVER);
    }
    let quarters =
        (0..4).map(|k| Run::arc(at(12.0, -7.0), 40.0, f64::from(k) * FRAC_PI_2, FRAC_PI_2).unwrap());
    let quarters = group(quarters.collect(), LEG);
    assert!((strength(&quarters, 17.0) / whole - 1.0).abs() <= SOLVER);
}

/// Parallel lines of one leg pushed through their centroid at an angle theta move along the force:
/// R_n = 0.60 F t L g(theta, Delta_u(theta)).
#[test]
fn translation_of_parallel_lines_at_any_angle() {
    let one = group(vec![straight([-30.0, -40.0], [30.0, 40.0])], LEG);
    let two =
        group(vec![straight([-75.0, -50.0], [-75.0, 50.0]), straight([75.0, -50.0], [75.0, 50.0])], LEG);
    let axis_of_one = 40.0_f64.atan2(30.0).to_degrees();
    for id in LAWS {
        for theta in [0.0, 0.5, 3.0, 11.4, 30.0, 45.0, 72.0, 90.0] {
            let g = strength(id, theta, limit(id, theta).min(1.0));
            for (welds, axis, length) in [(&one, axis_of_one, 100.0), (&two, 90.0, 200.0)] {
                let (sine, cosine) = f64::to_radians(axis + theta).sin_cos();
                let answer =
                    solve_by(welds, &load([0.0, 0.0], [1000.0 * cosine, 1000.0 * sine], 0.0), shipped(id));
                let expected = PER_LENGTH * length * g / 1000.0;
                has_state(&answer, expected, &format!("{id}, {theta} degrees, length {length}"));
            }
        }
    }
}

/// A line that turns about a point c of itself moves square to itself: with u = |x - c| Delta_u(90) / (reach of
/// the farther end), F = 1.5 x 0.60 F t x integral of sign f(p), M likewise with the lever. For a load beyond the
/// centroid the farther end from c is the one at the load.
#[test]
fn a_centre_on_the_weld() {
    for id in LAWS {
        for centre in [-50.0, -20.0, -0.5] {
            let half = 60.0;
            let reach = half - centre;
            let g = |s: f64| {
                let share = if limit(id, 90.0).is_finite() { limit(id, 90.0) } else { 1.0 };
                strength(id, 90.0, s / reach * share)
            };
            // The polynomial law has a step of 0.5 % at p = 0.0325: integrate each side of it.
            let step = reach * 0.0325 * 0.209 * 92.0_f64.powf(-0.32) / limit(id, 90.0).min(1.0);
            let integral = |f: &dyn Fn(f64) -> f64, low: f64, high: f64| {
                let step = step.min(high);
                integral(f, low, step) + integral(f, step, high)
            };
            let force = integral(&g, 0.0, reach) - integral(&g, 0.0, half + centre);
            let moment = integral(&|s| g(s) * (centre + s), 0.0, reach)
                - integral(&|s| g(s) * (centre - s), 0.0, half + centre);
            let line = group(vec![straight([-half, 0.0], [half, 0.0])], LEG);
            let answer = solve_by(&line, &load([moment / force, 0.0], [0.0, 1000.0], 0.0), shipped(id));
            has_state(&answer, PER_LENGTH * force / 1000.0, &format!("{id}, centre {centre}"));
        }
    }
    // A T whose flange carries the centre: the answer is in equilibrium and the centre lies where symmetry wants it.
    let tee = group(vec![straight([-60.0, 0.0], [60.0, 0.0]), straight([0.0, 0.0], [0.0, -90.0])], LEG);
    let answer = solve(&tee, &load([0.0, 0.0], [0.0, 0.0], 1e6));
    for state in &answer.ultimate.states {
        assert!(state.residual <= SOLVER);
    }
    let [x, y] = answer.ultimate.governing().centre.unwrap();
    assert!(x.abs() < 1e-6 && y < 0.0 && y > -90.0, "{x}, {y}");
}

/// First order in the eccentricity: the rupturing corner changes with its sign.
#[test]
fn a_load_that_comes_to_the_centroid_changes_smoothly() {
    let welds = group(
        vec![
            straight([-60.0, -40.0], [60.0, -40.0]),
            straight([60.0, -40.0], [60.0, 40.0]),
            straight([60.0, 40.0], [-60.0, 40.0]),
            straight([-60.0, 40.0], [-60.0, -40.0]),
        ],
        LEG,
    );
    let (sine, cosine) = 50.0_f64.to_radians().sin_cos();
    let at = |e: f64| factor(&welds, &load([-e * sine, e * cosine], [1000.0 * cosine, 1000.0 * sine], 0.0));
    let concentric = at(0.0);
    let mut before = f64::INFINITY;
    for power in 0..7 {
        let e = 10.0_f64.powi(-power);
        let (left, right) = (at(-e) / concentric - 1.0, at(e) / concentric - 1.0);
        let change = left.abs().max(right.abs());
        // 120 mm wide: an eccentricity of 1 mm cannot change the strength by more than a few times 1/120.
        assert!(change <= 0.05 * e + SOLVER, "e = {e}: {left}, {right}");
        assert!(change < before || change <= SOLVER, "e = {e}: {change} after {before}");
        before = change;
    }
}

/// At a distance of n lengths the moment is n times the force's own lever: first order in 1 / n.
#[test]
fn a_distant_load_is_a_moment() {
    for shape in ["c", "l", "two-lines", "line"] {
        let welds = group(shapes::runs(shape, 0.5, 100.0), LEG);
        let pure = factor(&welds, &load([0.0, 0.0], [0.0, 0.0], 1e6));
        let at = |lengths: f64| {
            let distance = 100.0 * lengths;
            let load = shapes::load(&welds, lengths, 100.0, 0.0, 1e6 / distance);
            (factor(&welds, &load) / pure - 1.0).abs()
        };
        let changes = [at(1e3), at(1e4), at(1e5)];
        assert!(changes[0] < 2e-3, "{shape}: {changes:?}");
        for pair in changes.windows(2) {
            // Second order where a symmetry cancels the first, first order elsewhere.
            assert!(pair[1] < 0.2 * pair[0] || pair[1] <= SOLVER, "{shape}: {changes:?}");
        }
    }
}

/// With one leg in the whole group deformations and strengths are proportional to it: the load factor is too,
/// however short the runs are beside it. Whether a run shorter than its leg is a weld at all is for the findings.
#[test]
fn runs_shorter_than_the_leg() {
    let runs = || {
        vec![
            straight([0.0, 0.0], [3.0, 0.0]),
            straight([0.0, 8.0], [2.0, 9.0]),
            straight([5.0, 2.0], [5.0, 4.0]),
        ]
    };
    let load = load([30.0, 4.0], [200.0, -900.0], 0.0);
    let slim = factor(&group(runs(), 0.05), &load);
    for leg in [1.0, 12.0, 50.0] {
        let stout = factor(&group(runs(), leg), &load);
        assert!((stout / slim * 0.05 / leg - 1.0).abs() <= SOLVER, "leg {leg}");
    }
}

#[test]
fn huge_and_tiny_joints() {
    let scaled = |scale: f64| {
        let point = |x: f64, y: f64| [x * scale, y * scale];
        let welds = WeldGroup::new(vec![
            weld("a", straight(point(0.0, 0.0), point(0.0, 120.0)), 6.0 * scale),
            weld("b", straight(point(0.0, 0.0), point(70.0, 0.0)), 9.0 * scale),
            weld("c", Run::arc(at(40.0, 90.0) * scale, 25.0 * scale, 0.3, FRAC_PI_4).unwrap(), 6.0 * scale),
        ]);
        factor(&welds.unwrap(), &load(point(200.0, 30.0), [100.0, -1000.0], 0.0)) / (scale * scale)
    };
    let usual = scaled(1.0);
    // Legs of 0.0012 mm to 1.2 km, within the accepted range of the model.
    for scale in [2e-4, 1e-2, 1e2, 1e5] {
        assert!((scaled(scale) / usual - 1.0).abs() <= SOLVER, "{scale}: {} against {usual}", scaled(scale));
    }
}

#[test]
fn a_zero_load_needs_no_strength() {
    let text = "units = \"metric\"\nrules = \"nominal\"\n[filler]\nstrength = 490\n[[weld]]\nname = \"a\"\nleg = 6\n\
        path = [[0, 0], [0, 100]]\n[[load]]\ncase = \"none\"\nat = [50, 0]\nforce = [0, 0]\n";
    let joint = read_joint("zero.toml", text, &Options::default()).unwrap();
    let report = weldpole::analysis::analyse(&joint);
    let case = &report.cases[0];
    assert_eq!(case.status, weldpole::analysis::Status::Satisfied);
    assert!(case.ultimate().is_none() && case.elastic().is_none() && case.checks.is_empty());
    assert!(report.findings.iter().any(|finding| finding.message.contains("the load is zero")));
}
