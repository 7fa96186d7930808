//! A hand-built report for the tests of the writers: two welds of different legs, two cases, round numbers.
//!
//! The numbers are made up to be told apart in the output; they satisfy no equation except that each column
//! of element forces sums to the load.

use crate::analysis::{
    Analyses, CaseReport, CellForce, Check, ElementRow, Finding, Grade, Report, Section, Status, Verification,
};
use crate::diagnostic::{self, Diagnostic, Severity};
use crate::model::{
    AppliedLoad, Basis, Confirmation, DesignFactor, Directional, Discretisation, Document, Filler,
    FilletSize, Joint, Law, LawForm, LoadCase, RuleSet, Run, Sourced, Vector, Weld, WeldGroup, Wrench,
};
use crate::solvers::{Elastic, ElasticPeak, Motion, NotSolved, Place, Reason, Rupture, State, Ultimate};
use crate::units::UnitSystem;

/// A sourced number.
fn number(value: f64, status: Confirmation) -> Sourced {
    Sourced { value, clause: "X2.4".into(), source: "made up for the tests".into(), status }
}

/// A rule set that accepts both methods, phi = 0.75.
pub(super) fn rules() -> RuleSet {
    RuleSet {
        id: "made-up-lrfd".into(),
        title: "Made-up specification, load and resistance factors".into(),
        edition: "MU 1:2000".into(),
        law: "made-up-law".into(),
        longitudinal: number(0.6, Confirmation::Read),
        design: DesignFactor::Resistance(number(0.75, Confirmation::Recalled)),
        accepts: vec![Basis::Ultimate, Basis::Elastic],
        ultimate_laws: Vec::new(),
        ultimate_clause: "X2.4, note".into(),
        elastic_clause: "X2.4(a)".into(),
        concentric: Vec::new(),
        remarks: vec!["Made up for the tests; of no use to anyone who builds.".into()],
    }
}

/// A law without a deformation limit.
pub(super) fn law() -> Law {
    Law {
        id: "made-up-law".into(),
        title: "Made-up law".into(),
        source: "nobody, nowhere".into(),
        status: Confirmation::Recalled,
        form: LawForm::RigidPlastic { directional: Directional { amplitude: 0.5 } },
    }
}

fn weld(name: &str, leg: f64, x: f64) -> Weld {
    let run = Run::straight(Vector::new(x, 0.0, 0.0), Vector::new(x, 100.0, 0.0)).unwrap();
    Weld {
        name: name.into(),
        runs: vec![run],
        size: FilletSize::from_legs([leg, leg], std::f64::consts::FRAC_PI_2).unwrap(),
        filler: Filler::new(None, 490.0).unwrap(),
        sides: 1,
        plates: Vec::new(),
        set: None,
    }
}

fn joint() -> Joint {
    let wrench = Wrench {
        force: Vector::new(0.0, -60_000.0, 0.0),
        moment: Vector::zeros(),
        reference: Vector::new(200.0, 50.0, 0.0),
    };
    let load = AppliedLoad { case: "crane".into(), factor: 1.0, placed: true, wrench };
    let crane = LoadCase::new("crane".into(), vec![load]);
    Joint {
        file: "davit.toml".into(),
        title: "Davit bracket, pier 4".into(),
        units: UnitSystem::Metric,
        rules: rules(),
        law: law(),
        discretisation: Discretisation::Continuous,
        filler: None,
        plates: Vec::new(),
        group: WeldGroup::new(vec![weld("back", 8.0, 0.0), weld("front", 6.0, 80.0)]).unwrap(),
        cases: vec![crane],
        combined: false,
        unused_cases: Vec::new(),
        document: Document::default(),
    }
}

fn check(id: &str, basis: Basis, load_factor: f64) -> Check {
    let design_load_factor = 0.75 * load_factor;
    Check {
        id: id.into(),
        basis,
        clause: "X2.4".into(),
        subject: format!("strength of the weld group, {id}"),
        load_factor,
        design_load_factor,
        demand: 60_000.0,
        resistance: 60_000.0 * design_load_factor,
        in_moment: false,
        utilisation: 1.0 / design_load_factor,
        error_estimate: 1e-9,
        satisfied: design_load_factor >= 1.0,
        accepted: true,
        values: Confirmation::Recalled,
    }
}

fn state(load_factor: f64, centre: Option<[f64; 2]>) -> State {
    let place = Place { weld: 1, run: 0, at: Vector::new(80.0, 100.0, 0.0) };
    State {
        load_factor,
        motion: Motion { translation: [0.25, -0.5], rotation: -0.01 },
        centre,
        critical: Some(Rupture { place, angle: 0.9, deformation: 0.5, limit: 0.5 }),
        residual: 1.5e-12,
        error_estimate: 1e-9,
        iterations: 7,
    }
}

fn element(weld: usize, x: f64, share: f64) -> ElementRow {
    let cell = |force_per_length: f64| CellForce {
        force: Vector::new(0.0, -60_000.0 * share, 0.0),
        moment: Vector::new(0.0, 0.0, -9.6e6 * share),
        force_per_length,
    };
    ElementRow {
        weld,
        run: 0,
        element: 1,
        at: Vector::new(x, 50.0, 0.0),
        length: 100.0,
        angle: Some(0.5),
        deformation: Some(0.4),
        deformation_ratio: Some(0.8),
        ultimate: Some(cell(600.0 * share)),
        elastic: cell(700.0 * share),
        elastic_ratio: 1.0,
    }
}

/// A loaded case whose ultimate method reaches `factor` times the load.
pub(super) fn case(name: &str, factor: f64) -> CaseReport {
    let peak = Place { weld: 0, run: 0, at: Vector::new(0.0, 100.0, 0.0) };
    let ultimate = Ultimate {
        states: vec![state(factor, Some([-12.5, 50.0])), state(1.1 * factor, None)],
        peak_load_factor: Some(1.05 * factor),
        reached: Some(1),
        incomplete: false,
    };
    let elastic = Elastic {
        load_factor: 0.8 * factor,
        critical: ElasticPeak { place: peak, force_per_length: Vector::new(300.0, -400.0, 0.0) },
        stress_motion: Motion { translation: [0.0, -25.0], rotation: -0.3 },
    };
    let checks = vec![
        check("instantaneous-centre", Basis::Ultimate, factor),
        check("elastic-vector", Basis::Elastic, 0.8 * factor),
    ];
    let (utilisation, satisfied) = (checks[0].utilisation, checks[0].satisfied);
    CaseReport {
        name: name.into(),
        load: Wrench {
            force: Vector::new(0.0, -60_000.0, 0.0),
            moment: Vector::new(0.0, 0.0, -9.6e6),
            reference: Vector::new(34.3, 50.0, 0.0),
        },
        status: if satisfied { Status::Satisfied } else { Status::Exceeded },
        verification: Some(Verification {
            basis: Basis::Ultimate,
            check: "instantaneous-centre".into(),
            utilisation,
        }),
        analyses: Analyses::Loaded { ultimate: Ok(ultimate), elastic },
        checks,
        elements: vec![element(0, 0.0, 0.6), element(1, 80.0, 0.4)],
    }
}

/// A case without load.
pub(super) fn unloaded(name: &str) -> CaseReport {
    CaseReport {
        load: Wrench { force: Vector::zeros(), moment: Vector::zeros(), reference: Vector::zeros() },
        status: Status::Satisfied,
        verification: None,
        analyses: Analyses::Unloaded,
        checks: Vec::new(),
        elements: Vec::new(),
        ..case(name, 2.0)
    }
}

/// A case the ultimate analysis could not solve.
pub(super) fn unsolved(name: &str) -> CaseReport {
    let mut case = case(name, 2.0);
    case.status = Status::NotSolved;
    case.verification = None;
    case.checks.remove(0);
    if let Analyses::Loaded { ultimate, .. } = &mut case.analyses {
        let trace = vec![0.1, 0.02];
        *ultimate = Err(NotSolved { reason: Reason::Stalled, residual: 0.02, best: None, trace });
    }
    for row in &mut case.elements {
        (row.angle, row.deformation, row.deformation_ratio, row.ultimate) = (None, None, None, None);
    }
    case
}

/// A report of these cases, the one at `governing` deciding.
pub(super) fn report(cases: Vec<CaseReport>, governing: Option<usize>) -> Report {
    Report {
        joint: joint(),
        section: Section {
            length: 200.0,
            throat_area: 989.949_493_661_167,
            centroid: Vector::new(34.285_714_285_714, 50.0, 0.0),
            i_x: 824_957.9,
            i_y: 1_551_000.0,
            i_xy: 0.0,
            j: 2_375_957.9,
        },
        cases,
        governing,
        findings: vec![Finding {
            grade: Grade::Caution,
            clause: "X2.4, note".into(),
            subject: "instantaneous-centre method".into(),
            message: "The values of this rule set are recalled and have to be confirmed against the text."
                .into(),
        }],
    }
}

/// The same report under rules that take the ultimate analysis as information only.
pub(super) fn behind_the_firewall(mut report: Report) -> Report {
    report.joint.rules.accepts = vec![Basis::Elastic];
    for case in &mut report.cases {
        for check in case.checks.iter_mut().filter(|check| check.basis == Basis::Ultimate) {
            check.accepted = false;
        }
        case.checks.reverse();
        let elastic = &case.checks[0];
        case.status = if elastic.satisfied { Status::Satisfied } else { Status::Exceeded };
        case.verification = Some(Verification {
            basis: Basis::Elastic,
            check: elastic.id.clone(),
            utilisation: elastic.utilisation,
        });
    }
    report
}

/// A fault in a file that could not be read.
pub(super) fn fault() -> Diagnostic {
    Diagnostic {
        severity: Severity::Fault,
        file: "bad.toml".into(),
        place: Some(diagnostic::Place { span: 10..13, line: 2, column: 3 }),
        message: "unknown key `leeg`".into(),
        accepted: Some("leg, legs, throat".into()),
        hint: Some("did you mean `leg`?".into()),
    }
}
