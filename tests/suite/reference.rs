//! Every joint of `tests/reference/holdout.toml` against the library.
//!
//! All expected values are *independent*: they come from `tests/reference/reference.py`, which shares no code,
//! no quadrature and no search with the library. They are stored with 12 digits.

use crate::fixture::at;
use serde::Deserialize;
use std::f64::consts::FRAC_PI_2;
use weldpole::input::catalog;
use weldpole::mechanics::{PlaneGroup, Section};
use weldpole::model::{Discretisation, Filler, FilletSize, Run, Vector, Weld, WeldGroup, Wrench};
use weldpole::solvers::{State, Ultimate, UltimateSettings, UltimateSolver, elastic};

const HOLDOUT: &str = include_str!("../reference/holdout.toml");

/// Load factors: the solver stops at an error estimate of 1e-9, which overestimates the error a hundredfold or
/// more; the reference claims 1e-11.
const LOAD_FACTOR: f64 = 1e-9;
/// Closed forms on both sides, 12 stored digits.
const PROPERTIES: f64 = 1e-11;
/// Centre: share of its distance from the centroid ...
const CENTRE: f64 = 1e-8;
/// ... and mm besides: 1e-8 of the joints' size is what the reference claims.
const CENTRE_MM: f64 = 1e-6;
/// Peaks are found where the load turns, so an error of 1e-6 along the path leaves 1e-12; the reference has 1e-9.
const PEAK: f64 = 1e-8;
/// The reference calls a motion a translation below |omega| rho / |v| = 1e-9.
const TRANSLATION: f64 = 1e-9;
/// How many times its own estimate an error may be.
const HONEST: f64 = 10.0;
/// Half a unit of the twelfth stored digit.
const STORED: f64 = 5e-12;

#[derive(Debug, Deserialize)]
#[serde(deny_unknown_fields)]
struct File {
    case: Vec<Case>,
}

#[derive(Debug, Deserialize)]
#[serde(deny_unknown_fields)]
struct Case {
    name: String,
    law: String,
    elements: Option<usize>,
    at: [f64; 2],
    force: [f64; 2],
    moment: f64,
    length: f64,
    throat_area: f64,
    centroid: [f64; 2],
    i_x: f64,
    i_y: f64,
    i_xy: f64,
    j: f64,
    elastic_load_factor: f64,
    peak_load_factor: Option<f64>,
    path_load_factor: Option<f64>,
    run: Vec<Piece>,
    state: Vec<Expected>,
}

#[derive(Debug, Deserialize)]
#[serde(deny_unknown_fields)]
struct Piece {
    from: Option<[f64; 2]>,
    to: Option<[f64; 2]>,
    centre: Option<[f64; 2]>,
    radius: Option<f64>,
    start_deg: Option<f64>,
    sweep_deg: Option<f64>,
    leg: f64,
    strength: f64,
    sides: u8,
}

#[derive(Debug, Deserialize)]
#[serde(deny_unknown_fields)]
struct Expected {
    load_factor: f64,
    centre: Option<[f64; 2]>,
}

impl Piece {
    fn run(&self) -> Run {
        if let (Some(from), Some(to)) = (self.from, self.to) {
            return Run::straight(at(from[0], from[1]), at(to[0], to[1])).unwrap();
        }
        let centre = self.centre.unwrap();
        let [start, sweep] = [self.start_deg, self.sweep_deg].map(|angle| angle.unwrap().to_radians());
        Run::arc(at(centre[0], centre[1]), self.radius.unwrap(), start, sweep).unwrap()
    }

    fn weld(&self, index: usize) -> Weld {
        Weld {
            name: format!("w{index}"),
            runs: vec![self.run()],
            size: FilletSize::from_legs([self.leg, self.leg], FRAC_PI_2).unwrap(),
            filler: Filler::new(None, self.strength).unwrap(),
            sides: self.sides,
            plates: vec![],
            set: None,
        }
    }
}

impl Case {
    fn welds(&self) -> WeldGroup {
        WeldGroup::new(self.run.iter().enumerate().map(|(index, piece)| piece.weld(index)).collect()).unwrap()
    }

    fn load(&self) -> Wrench {
        let moment = Vector::new(0.0, 0.0, self.moment);
        Wrench::new(at(self.at[0], self.at[1]), at(self.force[0], self.force[1]), moment).unwrap()
    }

    fn plane(&self, welds: &WeldGroup) -> PlaneGroup {
        let law = catalog::law(&self.law).unwrap();
        let discretisation = self.elements.map_or(Discretisation::Continuous, Discretisation::Elements);
        PlaneGroup::new(welds, law, 0.60, discretisation)
    }

    fn solve(&self, settings: UltimateSettings) -> Ultimate {
        let welds = self.welds();
        let plane = self.plane(&welds);
        let answer = UltimateSolver::new(&plane, settings).solve(&plane.triple(&self.load()));
        answer.unwrap_or_else(|reason| panic!("{}: {reason}", self.name))
    }
}

fn cases() -> Vec<Case> {
    toml::from_str::<File>(HOLDOUT).unwrap().case
}

fn relative(own: f64, expected: f64) -> f64 {
    (own / expected - 1.0).abs()
}

/// How far two centres lie apart, as a share of what is allowed; infinite where one is a translation only.
fn apart(own: &State, expected: Option<[f64; 2]>, section: &Section) -> f64 {
    let centroid = [section.centroid.x, section.centroid.y];
    let gyration = (section.j / section.throat_area).sqrt();
    let distance = |a: [f64; 2], b: [f64; 2]| (a[0] - b[0]).hypot(a[1] - b[1]);
    match (own.centre, expected) {
        (Some(own), Some(expected)) => {
            distance(own, expected) / (CENTRE * distance(expected, centroid) + CENTRE_MM)
        }
        (Some(centre), None) if distance(centre, centroid) < gyration / TRANSLATION => f64::INFINITY,
        (_, None) => 0.0,
        (None, Some(_)) => f64::INFINITY,
    }
}

/// Pairs each expected state with the nearest own one that is still free, mirror twins by their centres.
fn pairs<'a>(own: &'a [State], case: &'a Case, section: &Section) -> Vec<(&'a State, &'a Expected)> {
    assert_eq!(own.len(), case.state.len(), "{}: {own:#?}", case.name);
    let mut free: Vec<&State> = own.iter().collect();
    let mut pairs = Vec::new();
    for expected in &case.state {
        let wrong = |state: &State| {
            (
                relative(state.load_factor, expected.load_factor) > LOAD_FACTOR,
                apart(state, expected.centre, section),
            )
        };
        let (nearest, _) = free
            .iter()
            .enumerate()
            .min_by(|(_, a), (_, b)| wrong(a).partial_cmp(&wrong(b)).unwrap())
            .unwrap();
        pairs.push((free.remove(nearest), expected));
    }
    pairs
}

#[test]
fn the_file_is_whole() {
    let cases = cases();
    assert_eq!(cases.len(), 85);
    assert_eq!(cases.iter().map(|case| case.state.len()).sum::<usize>(), 139);
    for law in ["lesik-kennedy", "lesik-kennedy-polynomial", "butler-pal-kulak", "rigid-plastic"] {
        assert!(cases.iter().filter(|case| case.law == law).count() >= 5, "{law}");
    }
    assert_eq!(cases.iter().filter(|case| case.elements.is_some()).count(), 7);
}

#[test]
fn line_properties_and_elastic_load_factors() {
    for case in cases() {
        let welds = case.welds();
        let section = Section::of(&welds);
        // The reference counts a run once; the library counts both sides.
        let length: f64 = welds.welds().iter().map(Weld::length).sum();
        let both: f64 = welds.welds().iter().map(|weld| weld.length() * f64::from(weld.sides)).sum();
        let size = (case.j / case.throat_area).sqrt();
        let close = |what: &str, own: f64, expected: f64, scale: f64| {
            assert!((own - expected).abs() <= PROPERTIES * scale, "{}: {what} {own}, {expected}", case.name);
        };
        close("length", length, case.length, case.length);
        close("length of both sides", section.length, both, both);
        close("throat area", section.throat_area, case.throat_area, case.throat_area);
        let reach = size + case.centroid[0].hypot(case.centroid[1]);
        close("centroid x", section.centroid.x, case.centroid[0], reach);
        close("centroid y", section.centroid.y, case.centroid[1], reach);
        close("I_x", section.i_x, case.i_x, case.j);
        close("I_y", section.i_y, case.i_y, case.j);
        close("I_xy", section.i_xy, case.i_xy, case.j);
        close("J", section.j, case.j, case.j);
        let plane = case.plane(&welds);
        let answer = elastic(&plane, &welds, 0.60, &plane.triple(&case.load())).unwrap();
        close("elastic load factor", answer.load_factor, case.elastic_load_factor, case.elastic_load_factor);
    }
}

#[test]
fn every_state_of_every_joint() {
    let (mut factor, mut centre, mut residual) = ((0.0, String::new()), (0.0, String::new()), 0.0_f64);
    for case in cases() {
        let settings = UltimateSettings { path: false, ..UltimateSettings::default() };
        let answer = case.solve(settings);
        let section = Section::of(&case.welds());
        for (own, expected) in pairs(&answer.states, &case, &section) {
            let difference = relative(own.load_factor, expected.load_factor);
            assert!(difference <= LOAD_FACTOR, "{}: {} {}", case.name, own.load_factor, expected.load_factor);
            let gap = apart(own, expected.centre, &section);
            assert!(gap <= 1.0, "{}: centre {:?}, {:?}", case.name, own.centre, expected.centre);
            if difference > factor.0 {
                factor = (difference, case.name.clone());
            }
            if gap > centre.0 {
                centre = (gap, case.name.clone());
            }
            residual = residual.max(own.residual);
        }
        let smallest = case.state.iter().map(|state| state.load_factor).fold(f64::INFINITY, f64::min);
        assert!(relative(answer.governing().load_factor, smallest) <= LOAD_FACTOR);
    }
    println!(
        "largest difference: load factor {:.1e} ({}), centre {:.1e} of what is allowed ({}); largest residual \
         {residual:.1e}",
        factor.0, factor.1, centre.0, centre.1
    );
}

#[test]
fn peaks_on_the_path_from_zero_load() {
    let (mut count, mut worst) = (0, 0.0_f64);
    for case in cases() {
        let (Some(peak), Some(reached)) = (case.peak_load_factor, case.path_load_factor) else { continue };
        let answer = case.solve(UltimateSettings::default());
        let own = answer.peak_load_factor.unwrap_or_else(|| panic!("{}: path lost", case.name));
        assert!(relative(own, peak) <= PEAK, "{}: peak {own}, {peak}", case.name);
        let ending = answer.states[answer.reached.unwrap()].load_factor;
        assert!(
            relative(ending, reached) <= LOAD_FACTOR,
            "{}: the path ends in {ending}, {reached}",
            case.name
        );
        worst = worst.max(relative(own, peak));
        count += 1;
    }
    assert_eq!(count, 23);
    println!("{count} peaks, largest difference {worst:.1e}");
}

/// Ratios of error to estimate.
#[derive(Default)]
pub struct Honesty {
    ratios: Vec<f64>,
    error: f64,
    estimate: f64,
}

impl Honesty {
    pub fn note(&mut self, error: f64, estimate: f64) {
        self.ratios.push(error / estimate);
        self.error = self.error.max(error);
        self.estimate = self.estimate.max(estimate);
    }

    pub fn judge(mut self, against: &str) {
        self.ratios.sort_by(f64::total_cmp);
        let count = self.ratios.len();
        let within = self.ratios.iter().filter(|ratio| **ratio <= HONEST).count();
        println!(
            "against {against}: {count} states, error over estimate: median {:.1e}, 99 % {:.1e}, largest {:.1e}; \
             largest error {:.1e}, largest estimate {:.1e}; within {HONEST} times: {within}",
            self.ratios[count / 2],
            self.ratios[count * 99 / 100],
            self.ratios[count - 1],
            self.error,
            self.estimate
        );
        assert!(within as f64 >= 0.999 * count as f64, "{within} of {count}");
    }
}

#[test]
fn error_estimates_are_honest_on_the_stored_states() {
    let (mut stored, mut tighter) = (Honesty::default(), Honesty::default());
    let mut unanswered = Vec::new();
    for case in cases() {
        let settings = UltimateSettings { path: false, ..UltimateSettings::default() };
        let answer = case.solve(settings.clone());
        let section = Section::of(&case.welds());
        for (own, expected) in pairs(&answer.states, &case, &section) {
            // What the twelfth digit hides is no error of ours.
            let error = (relative(own.load_factor, expected.load_factor) - STORED).max(0.0);
            stored.note(error, own.error_estimate);
        }
        let welds = case.welds();
        let plane = case.plane(&welds);
        let tight = UltimateSolver::new(&plane, UltimateSettings { tolerance: 1e-12, ..settings });
        match tight.solve(&plane.triple(&case.load())) {
            Ok(tight) if tight.states.len() == answer.states.len() => {
                for (own, better) in answer.states.iter().zip(&tight.states) {
                    tighter.note(relative(own.load_factor, better.load_factor), own.error_estimate);
                }
            }
            _ => unanswered.push(case.name),
        }
    }
    stored.judge("the stored reference");
    println!("not all states reach 1e-12: {}", unanswered.join(", "));
    assert!(unanswered.len() <= 8, "{unanswered:?}");
    tighter.judge("a solve to 1e-12");
}

/// Three single lines under loads that turn them about a point of themselves were refused: 20 nodes a panel have
/// the load factor to 3e-12, but the finest rule was only compared with 14 nodes, which differ by 1e-8.
#[test]
fn a_line_that_turns_about_a_point_of_itself_is_answered() {
    for name in ["line-pure-moment", "line-far", "bpk-centre-on-weld"] {
        let case = cases().into_iter().find(|case| case.name == name).unwrap();
        let answer = case.solve(UltimateSettings::default());
        assert!(relative(answer.governing().load_factor, case.state[0].load_factor) <= LOAD_FACTOR, "{name}");
    }
}

/// Inside a fold the deformation ratio can pass 1, fall and pass 1 again along the path. One step of the path used
/// to leave out the first passage, so a later state was named as the one the path leads to.
#[test]
fn the_path_ends_at_the_first_of_several_ruptures() {
    for (name, first) in [("line-fold", 187.003_310_531), ("five-states-1", 353.420_874_631)] {
        let case = cases().into_iter().find(|case| case.name == name).unwrap();
        let answer = case.solve(UltimateSettings::default());
        assert!(relative(answer.states[answer.reached.unwrap()].load_factor, first) <= LOAD_FACTOR, "{name}");
    }
}
