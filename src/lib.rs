//! Strength of eccentrically loaded fillet weld groups by the instantaneous-centre method, beside the elastic
//! vector method.
//!
//! A part that moves as a rigid body by `q = (v, omega)` displaces its welds by `u(x) = v + omega x (x - c)`;
//! they resist with a force per length against u, whose size follows from a load-deformation law. All welds
//! together carry the wrench `W(q)`. The strength under a load L is the factor lambda with `W(q) = lambda L`
//! at which the first point of the weld reaches its rupture deformation. The elastic vector method is the
//! same question with a linear law that is blind to direction.
//!
//! # The path of the data
//!
//! ```text
//! text --input--> model::Joint --analysis--> analysis::Report --output--> text, JSON, CSV, SVG
//!                                    |
//!           mechanics: what a motion produces    solvers: which motion is the answer
//!                                    verify: is the answer enough
//! ```
//!
//! Every stage is a plain value that can be printed and compared. The library reads no file, clock or
//! environment and prints nothing: the caller hands over text and writes what comes back. Inside, everything is
//! in N, mm, N mm, MPa and rad; x points right, y up, moments turn anticlockwise, forces act on the moving part.
//!
//! # Modules
//!
//! | module | holds |
//! |---|---|
//! | [`units`] | the only place that converts |
//! | [`diagnostic`] | faults of an input with place, accepted values and hint |
//! | [`numerics`] | quadrature and roots, with no weld in sight |
//! | [`model`] | what exists: welds, loads, fillers, laws, rule sets; constructors refuse nonsense |
//! | [`input`] | joint file to model, all faults in one pass; the catalogue of shipped data |
//! | [`mechanics`] | line properties, displacement, strength, resultant, rupture |
//! | [`solvers`] | elastic vector method; all equilibrium states at first rupture; the path from zero load |
//! | [`verify`] | checks against a rule set, and which of them decides |
//! | [`analysis`] | the pipeline from joint to report |
//! | [`study`] | many joints or loads through the analysis |
//! | [`output`] | report, sweep and self-check to text, JSON, CSV and drawings |
//!
//! # Example
//!
//! The demonstration joint, a davit bracket; `weldpole check --demo` shows the same answer.
//!
//! ```
//! use weldpole::analysis::{Status, analyse};
//! use weldpole::input::{Options, catalog, read_joint};
//!
//! let joint = read_joint("demo.toml", catalog::DEMO, &Options::default()).expect("the demonstration has no fault");
//! let report = analyse(&joint);
//! assert_eq!(report.verdict(), Status::Satisfied);
//!
//! let case = &report.cases[report.governing.expect("every case has an answer")];
//! assert_eq!(case.name, "1.2 dead + 1.6 crane");
//! let ultimate = case.ultimate_strength(&joint).expect("the load is not zero");
//! let elastic = case.elastic_strength(&joint).expect("the load is not zero");
//! assert!((ultimate.load_factor - 1.5144).abs() < 1e-4);
//! assert!((elastic.load_factor - 0.8796).abs() < 1e-4);
//!
//! // Changed from outside, as by `--set arm=350mm`: no longer enough.
//! let set = vec![("arm".to_owned(), "350mm".to_owned())];
//! let longer = read_joint("demo.toml", catalog::DEMO, &Options { set, ..Options::default() }).expect("a parameter");
//! assert_eq!(analyse(&longer).verdict(), Status::Exceeded);
//! ```
//!
//! Static strength of fillet welds between parts taken as rigid: no fatigue, brittle fracture, lamellar tearing or
//! seismic detailing. Results support, and do not replace, the judgement of a licensed engineer.
#![warn(missing_docs)]

pub mod analysis;
pub mod diagnostic;
pub mod input;
pub mod mechanics;
pub mod model;
pub mod numerics;
pub mod output;
pub mod solvers;
pub mod study;
pub mod units;
pub mod verify;
