//! What one answer costs: the numbers behind batches, sizing and sweeps.
//!
//! * `first state`: Newton from the elastic motion, to the default tolerance of 1e-9 (no search, no path);
//! * `all states, group known`: the same with the search for every state, the group's atlas sampled before;
//! * `all states, new group`: the atlas included, as for a joint seen once;
//! * `with path`: all states and the path from zero load with its peak;
//! * `elastic`: the elastic vector method;
//! * `check --demo`: text to report to text, as the command does, without starting a process.
//!
//! Each on a single line, a C of three runs and a ring, under an eccentric force. Compare within one run: the
//! machine's speed drifts. `cargo bench` prints the times; `cargo bench -- "C of three"` picks some.

#![allow(missing_docs)]

use criterion::{Criterion, criterion_group, criterion_main};
use std::f64::consts::{FRAC_PI_2, TAU};
use std::hint::black_box;
use weldpole::analysis::analyse;
use weldpole::input::{Options, catalog, read_joint};
use weldpole::mechanics::{PlaneGroup, Triple};
use weldpole::model::{Discretisation, Filler, FilletSize, Run, Vector, Weld, WeldGroup, Wrench};
use weldpole::output::{Layout, check_text};
use weldpole::solvers::{Search, UltimateSettings, UltimateSolver, elastic};

const LONGITUDINAL: f64 = 0.60;

struct Case {
    name: &'static str,
    welds: WeldGroup,
    group: PlaneGroup,
    load: Triple,
}

fn case(name: &'static str, runs: Vec<Run>, at: [f64; 2]) -> Case {
    let weld = Weld {
        name: name.into(),
        runs,
        size: FilletSize::from_legs([6.0, 6.0], FRAC_PI_2).expect("a 6 mm leg is a size"),
        filler: Filler::new(None, 490.0).expect("490 MPa is a strength"),
        sides: 1,
        plates: Vec::new(),
        set: None,
    };
    let welds = WeldGroup::new(vec![weld]).expect("one weld is a group");
    let law = catalog::law("lesik-kennedy").expect("the catalogue holds the law");
    let group = PlaneGroup::new(&welds, law, LONGITUDINAL, Discretisation::Continuous);
    let force = Vector::new(10e3, -40e3, 0.0);
    let load = Wrench::new(Vector::new(at[0], at[1], 0.0), force, Vector::zeros()).expect("a finite load");
    let load = group.triple(&load);
    Case { name, welds, group, load }
}

fn cases() -> Vec<Case> {
    let straight = |from: [f64; 2], to: [f64; 2]| {
        Run::straight(Vector::new(from[0], from[1], 0.0), Vector::new(to[0], to[1], 0.0))
            .expect("a run has length")
    };
    vec![
        case("single line", vec![straight([0.0, 0.0], [0.0, 200.0])], [120.0, 90.0]),
        case(
            "C of three runs",
            vec![
                straight([100.0, 0.0], [0.0, 0.0]),
                straight([0.0, 0.0], [0.0, 200.0]),
                straight([0.0, 200.0], [100.0, 200.0]),
            ],
            [250.0, 90.0],
        ),
        case(
            "ring",
            vec![Run::arc(Vector::zeros(), 60.0, 0.0, TAU).expect("a ring has length")],
            [150.0, 10.0],
        ),
    ]
}

fn solve(criterion: &mut Criterion) {
    let all = UltimateSettings { path: false, ..UltimateSettings::default() };
    let first = UltimateSettings { search: Search::First, ..all.clone() };
    for case in cases() {
        let mut group = criterion.benchmark_group(case.name);
        let load = black_box(case.load);
        let solver = UltimateSolver::new(&case.group, first.clone());
        group.bench_function("first state", |bencher| bencher.iter(|| solver.solve(&load)));
        let solver = UltimateSolver::new(&case.group, all.clone());
        group.bench_function("all states, group known", |bencher| bencher.iter(|| solver.solve(&load)));
        group.bench_function("all states, new group", |bencher| {
            bencher.iter(|| UltimateSolver::new(&case.group, all.clone()).solve(&load));
        });
        let solver = UltimateSolver::new(&case.group, UltimateSettings::default());
        group.bench_function("with path", |bencher| bencher.iter(|| solver.solve(&load)));
        group.bench_function("elastic", |bencher| {
            bencher.iter(|| elastic(&case.group, &case.welds, LONGITUDINAL, &load));
        });
        group.finish();
    }
}

fn check(criterion: &mut Criterion) {
    criterion.bench_function("check --demo", |bencher| {
        bencher.iter(|| {
            let joint =
                read_joint("demo", black_box(catalog::DEMO), &Options::default()).expect("the demo is valid");
            check_text(&[analyse(&joint)], &[], &Layout::default())
        });
    });
}

criterion_group! {
    name = benches;
    config = Criterion::default()
        .sample_size(20)
        .warm_up_time(std::time::Duration::from_millis(300))
        .measurement_time(std::time::Duration::from_secs(1));
    targets = solve, check
}
criterion_main!(benches);
