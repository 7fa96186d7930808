//! A hand-built self-check for the tests of its writers: one value that passes, one that is off, one without answer.

use crate::model::Discretisation;
use crate::output::fixture::law;
use crate::study::selfcheck::{
    Allowance, Method, Outcome, Printed, PublishedCase, Quantity, Reading, SelfCheck, Shape, Tolerance,
};
use crate::units::UnitSystem;

fn outcome(id: &str, printed: &str, computed: Result<f64, String>) -> Outcome {
    Outcome {
        case: PublishedCase {
            id: id.to_owned(),
            method: Method::InstantaneousCentre,
            shape: Shape::C,
            k: 0.5,
            a: 0.875,
            length: 254.0,
            load_angle_deg: 0.0,
            leg: 9.525,
            load: 1000.0,
            stress: None,
            units: UnitSystem::Us,
            quantity: Quantity::Coefficient,
            expected: Printed::read(printed).unwrap(),
            reading: Reading::Printed,
            source: "A handbook, 3rd ed.".to_owned(),
            place: "p. 7".to_owned(),
            note: String::new(),
        },
        tolerance: Tolerance {
            id: "table".to_owned(),
            allowance: Allowance::Relative(0.006),
            why: "the handbook prints three digits".to_owned(),
        },
        computed,
    }
}

fn check(outcomes: Vec<Outcome>) -> SelfCheck {
    SelfCheck {
        outcomes,
        law: law(),
        discretisation: Discretisation::Continuous,
        remarks: vec!["Made up for the tests.".to_owned()],
    }
}

/// Two values within their tolerances, of two documents, methods and kinds of tolerance.
pub(super) fn passed() -> SelfCheck {
    let mut throat = outcome("second", "4.538894", Ok(4.538_894_3));
    throat.case.method = Method::Elastic;
    throat.case.quantity = Quantity::Throat;
    throat.case.shape = Shape::Line;
    throat.case.load_angle_deg = 75.0;
    throat.case.source = "A textbook".to_owned();
    throat.tolerance = Tolerance {
        id: "digits".to_owned(),
        allowance: Allowance::LastDigit(0.5),
        why: "a closed form".to_owned(),
    };
    check(vec![outcome("first", "1.88", Ok(1.872)), throat])
}

/// The first value within its tolerance, the others not.
pub(super) fn failed() -> SelfCheck {
    let mut inertia = outcome("third", "333", Err("the search for equilibrium stalled".to_owned()));
    inertia.case.quantity = Quantity::DesignCoefficient;
    inertia.case.place = "p. 8".to_owned();
    check(vec![outcome("first", "1.88", Ok(1.872)), outcome("second", "1.88", Ok(1.9)), inertia])
}
