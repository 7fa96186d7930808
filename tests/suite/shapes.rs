//! The groups of the handbook tables: a vertical of length l, a second dimension k l, a load at a l.

use crate::fixture::{at, group};
use weldpole::mechanics::{PlaneGroup, Section};
use weldpole::model::{Discretisation, Law, Run, Vector, WeldGroup, Wrench};
use weldpole::solvers::{Search, UltimateSettings, UltimateSolver};
use weldpole::study::selfcheck::Shape;

/// 0.60 x 70 ksi x (1/16 in) / sqrt 2 in kip/in: strength of 1/16 in of E70 fillet per inch, without increase.
pub const KIP_PER_INCH: f64 = 0.60 * 70.0 / 16.0 * std::f64::consts::FRAC_1_SQRT_2;
/// The same with the throat 0.707 w, with which every digit of the concentric rows comes out; neither 1.856155
/// (k = 0.4) nor 1.392 / 0.75 = 1.856 (k = 0.7) gives them all.
pub const HANDBOOK_KIP_PER_INCH: f64 = 0.60 * 70.0 / 16.0 * 0.707;
/// Length l of the vertical, mm: any value serves, C does not depend on it.
pub const LENGTH: f64 = 240.0;
/// Leg, mm: any value serves.
pub const LEG: f64 = 6.0;

/// The runs of a shape of `data/cases`, for a vertical of length `l`.
pub fn runs(shape: &str, k: f64, l: f64) -> Vec<Run> {
    Shape::named(shape).unwrap_or_else(|| panic!("unknown shape {shape}")).runs(k, l).unwrap()
}

/// A force of `size` N through the point a l to the right of the centroid, at an angle from the vertical.
pub fn load(group: &WeldGroup, a: f64, l: f64, angle_deg: f64, size: f64) -> Wrench {
    let point = Section::of(group).centroid + at(a * l, 0.0);
    let (sine, cosine) = angle_deg.to_radians().sin_cos();
    Wrench::new(point, at(size * sine, size * cosine), Vector::zeros()).unwrap()
}

/// Coefficients C of all states, smallest first.
pub fn coefficients(
    shape: &str,
    k: f64,
    a: f64,
    angle_deg: f64,
    law: &Law,
    discretisation: Discretisation,
) -> Vec<f64> {
    let welds = group(runs(shape, k, LENGTH), LEG);
    let plane = PlaneGroup::new(&welds, law, 0.60, discretisation);
    let size = 1000.0;
    let load = load(&welds, a, LENGTH, angle_deg, size);
    // With elements one state is looked for: the handbook loads have one, as the continuous weld shows.
    let search = match discretisation {
        Discretisation::Continuous => Search::All,
        Discretisation::Elements(_) => Search::First,
    };
    let settings = UltimateSettings { path: false, search, ..UltimateSettings::default() };
    let solver = UltimateSolver::new(&plane, settings);
    let answer = solver.solve(&plane.triple(&load)).unwrap();
    let weld = &welds.welds()[0];
    let per_length = 0.60 * weld.filler.strength * weld.size.throat() * LENGTH;
    answer.states.iter().map(|state| KIP_PER_INCH * size * state.load_factor / per_length).collect()
}
