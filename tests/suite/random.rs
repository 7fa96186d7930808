//! Random groups and loads for property tests, with a fixed seed: the same cases in every run.

use crate::fixture::at;
use proptest::prelude::*;
use proptest::test_runner::{Config, RngAlgorithm, TestCaseResult, TestRng, TestRunner};
use std::f64::consts::FRAC_PI_2;
use weldpole::mechanics::{PlaneGroup, Section};
use weldpole::model::{Discretisation, Filler, FilletSize, Law, Run, Vector, Weld, WeldGroup, Wrench};
use weldpole::solvers::{Elastic, Search, Ultimate, UltimateSettings, UltimateSolver, elastic};

/// A run as plain numbers: all of them mm, degrees, MPa.
#[derive(Debug, Clone, Copy)]
pub struct Piece {
    pub from: [f64; 2],
    /// Length of a straight run, radius of an arc.
    pub length: f64,
    /// Direction of a straight run, start angle of an arc.
    pub turn: f64,
    /// Sweep of an arc; `None` for a straight run.
    pub sweep: Option<f64>,
    pub leg: f64,
    pub strength: f64,
    pub sides: u8,
}

impl Piece {
    pub fn run(&self) -> Run {
        let from = at(self.from[0], self.from[1]);
        let turn = self.turn.to_radians();
        match self.sweep {
            None => Run::straight(from, from + at(turn.cos(), turn.sin()) * self.length).unwrap(),
            Some(sweep) => Run::arc(from, self.length, turn, sweep.to_radians()).unwrap(),
        }
    }

    pub fn weld(&self, index: usize, run: Run) -> Weld {
        Weld {
            name: format!("w{index}"),
            runs: vec![run],
            size: FilletSize::from_legs([self.leg, self.leg], FRAC_PI_2).unwrap(),
            filler: Filler::new(None, self.strength).unwrap(),
            sides: self.sides,
            plates: vec![],
            set: None,
        }
    }
}

/// A joint as plain numbers.
#[derive(Debug, Clone)]
pub struct Sketch {
    pub pieces: Vec<Piece>,
    /// Point of the force, its angle in degrees, and a moment in N mm.
    pub at: [f64; 2],
    pub angle: f64,
    pub moment: f64,
}

/// Size of the force, N.
pub const FORCE: f64 = 1000.0;

impl Sketch {
    pub fn welds(&self) -> WeldGroup {
        let welds = self.pieces.iter().enumerate().map(|(index, piece)| piece.weld(index, piece.run()));
        WeldGroup::new(welds.collect()).unwrap()
    }

    /// All states for one case in sixteen, the first found for the rest: sampling a group takes a tenth of a
    /// second, one state a millisecond.
    pub fn search(&self) -> Search {
        if self.moment.to_bits().is_multiple_of(16) { Search::All } else { Search::First }
    }

    pub fn load(&self) -> Wrench {
        let (sine, cosine) = self.angle.to_radians().sin_cos();
        let force = at(FORCE * cosine, FORCE * sine);
        Wrench::new(at(self.at[0], self.at[1]), force, Vector::new(0.0, 0.0, self.moment)).unwrap()
    }
}

fn piece() -> impl Strategy<Value = Piece> {
    let place = [-150.0..150.0, -150.0..150.0];
    let sweep = prop_oneof![3 => Just(None), 1 => (30.0..360.0).prop_map(Some)];
    let legs = prop_oneof![Just(4.0), Just(6.0), Just(6.0), Just(10.0)];
    let strengths = prop_oneof![3 => Just(490.0), 1 => Just(430.0)];
    let sides = prop_oneof![4 => Just(1_u8), 1 => Just(2)];
    (place, 15.0..180.0, 0.0..360.0, sweep, legs, strengths, sides).prop_map(
        |(from, length, turn, sweep, leg, strength, sides)| Piece {
            from,
            length: if sweep.is_some() { length / 2.0 } else { length },
            turn,
            sweep,
            leg,
            strength,
            sides,
        },
    )
}

pub fn sketch() -> impl Strategy<Value = Sketch> {
    let pieces = proptest::collection::vec(piece(), 1..5);
    (pieces, [-300.0..300.0, -300.0..300.0], 0.0..360.0, -5e4..5e4)
        .prop_map(|(pieces, at, angle, moment)| Sketch { pieces, at, angle, moment })
}

/// Runs a property on `cases` values with the fixed seed.
pub fn check<S: Strategy>(cases: u32, strategy: &S, property: impl Fn(S::Value) -> TestCaseResult) {
    let config = Config { cases, failure_persistence: None, ..Config::default() };
    let rng = TestRng::deterministic_rng(RngAlgorithm::ChaCha);
    TestRunner::new_with_rng(config, rng)
        .run(strategy, property)
        .unwrap_or_else(|failure| panic!("{failure}"));
}

/// Both analyses of one group and load.
pub struct Answer {
    pub ultimate: Ultimate,
    pub elastic: Elastic,
    pub section: Section,
    pub gyration: f64,
}

pub fn answer(
    welds: &WeldGroup,
    load: &Wrench,
    law: &Law,
    discretisation: Discretisation,
    search: Search,
) -> Answer {
    let plane = PlaneGroup::new(welds, law, 0.60, discretisation);
    let triple = plane.triple(load);
    let settings = UltimateSettings { path: false, search, ..UltimateSettings::default() };
    let ultimate = UltimateSolver::new(&plane, settings).solve(&triple);
    Answer {
        ultimate: ultimate.unwrap_or_else(|reason| panic!("{reason}: {load:?} on {welds:?}")),
        elastic: elastic(&plane, welds, 0.60, &triple).unwrap(),
        section: plane.section,
        gyration: plane.gyration,
    }
}

/// The sketch as a joint file, lengths over `length` mm, forces over `force` N.
pub fn text(sketch: &Sketch, units: &str, length: f64, force: f64) -> String {
    use std::fmt::Write;
    let mut text = format!("units = \"{units}\"\nrules = \"nominal\"\n");
    let (stress, moment) = (force / (length * length), if units == "metric" { 1e6 } else { force * length });
    for (index, piece) in sketch.pieces.iter().enumerate() {
        let point = |vector: Vector| format!("[{:?}, {:?}]", vector.x / length, vector.y / length);
        writeln!(
            text,
            "[[weld]]\nname = \"w{index}\"\nleg = {:?}\nsides = {}\nfiller = {{ strength = {:?} }}",
            piece.leg / length,
            piece.sides,
            piece.strength / if units == "metric" { 1.0 } else { stress }
        )
        .unwrap();
        match piece.sweep {
            None => {
                let run = piece.run();
                writeln!(text, "path = [{}, {}]", point(run.point(0.0)), point(run.point(1.0))).unwrap();
            }
            Some(sweep) => writeln!(
                text,
                "arc = {{ centre = {}, radius = {:?}, start = {:?}, sweep = {sweep:?} }}",
                point(at(piece.from[0], piece.from[1])),
                piece.length / length,
                piece.turn
            )
            .unwrap(),
        }
    }
    let load = sketch.load();
    writeln!(
        text,
        "[[load]]\ncase = \"a\"\nat = [{:?}, {:?}]\nforce = [{:?}, {:?}]\nmoment = {:?}",
        load.reference.x / length,
        load.reference.y / length,
        load.force.x / force,
        load.force.y / force,
        load.moment.z / moment
    )
    .unwrap();
    text
}
