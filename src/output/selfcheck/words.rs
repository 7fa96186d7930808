//! The words of the self-check: verdicts, shapes, quantities, tolerances.

use crate::model::{Basis, Discretisation};
use crate::output::layout::Emphasis;
use crate::output::number::{count, share};
use crate::output::words;
use crate::study::selfcheck::{Allowance, Method, Outcome, PublishedCase, Quantity, Shape, Tolerance};

/// The verdict on one value or on all.
pub(super) fn verdict(passed: bool) -> &'static str {
    if passed { "passed" } else { "failed" }
}

/// How a verdict is emphasised.
pub(super) fn emphasis(passed: bool) -> Emphasis {
    if passed { Emphasis::Satisfied } else { Emphasis::Exceeded }
}

/// The name of a method, as the text of `check` has it.
pub(super) fn method(method: Method) -> &'static str {
    words::basis(match method {
        Method::InstantaneousCentre => Basis::Ultimate,
        Method::Concentric => Basis::Concentric,
        Method::Elastic => Basis::Elastic,
    })
}

/// How the welds are integrated.
pub(super) fn discretisation(discretisation: Discretisation) -> String {
    match discretisation {
        Discretisation::Continuous => "continuous, no elements".to_owned(),
        Discretisation::Elements(_) => words::discretisation(discretisation),
    }
}

/// The symbol of a quantity.
pub(super) fn symbol(quantity: Quantity) -> &'static str {
    match quantity {
        Quantity::Coefficient => "C",
        Quantity::DesignCoefficient => "0.75 C",
        Quantity::InertiaX => "I_x",
        Quantity::InertiaY => "I_y",
        Quantity::InertiaPolar => "I_p",
        Quantity::LineForce => "r",
        Quantity::LoadLrfd => "P_u",
        Quantity::LoadAsd => "P_a",
        Quantity::Throat => "t",
    }
}

/// What a quantity is: its symbols with those that are explained with it, and the explanation.
pub(super) fn meaning(quantity: Quantity) -> (&'static str, &'static str) {
    match quantity {
        Quantity::Coefficient | Quantity::DesignCoefficient => (
            "C",
            "R_n / (D l): nominal strength R_n, leg D in sixteenths of an inch, length l, E70 filler; 0.75 C: \
             the same for the design strength",
        ),
        Quantity::InertiaX | Quantity::InertiaY | Quantity::InertiaPolar => {
            ("I", "second moment of the welds as lines, per unit of throat")
        }
        Quantity::LineForce => ("r", "greatest elastic force per length under a unit load"),
        Quantity::LoadLrfd | Quantity::LoadAsd => {
            ("P_u, P_a", "design load by the elastic vector method, LRFD and ASD")
        }
        Quantity::Throat => ("t", "throat required at a permissible stress by the elastic vector method"),
    }
}

/// A quantity with its unit.
pub(super) fn measure(of: Quantity) -> String {
    format!("{} in {}", symbol(of), of.unit())
}

/// The shape and its ratios: `C shape, k 0.5, a 0.875`.
pub(super) fn shape(case: &PublishedCase) -> String {
    let name = match case.shape {
        Shape::Line => "one line",
        Shape::TwoLines => "two lines",
        Shape::TwoLinesAcross => "two lines across",
        Shape::C => "C shape",
        Shape::L => "L shape",
    };
    let second = if case.shape == Shape::Line { String::new() } else { format!(", k {}", case.k) };
    let angle = if case.load_angle_deg == 0.0 {
        String::new()
    } else {
        format!(", load at {} deg", case.load_angle_deg)
    };
    format!("{name}{second}, a {}{angle}", case.a)
}

/// How much a tolerance allows, in short.
pub(super) fn allowed(tolerance: &Tolerance) -> String {
    match tolerance.allowance {
        Allowance::Relative(relative) => share(relative),
        Allowance::LastDigit(units) => format!("{} digit", count(units)),
    }
}

/// How much a tolerance allows, in a sentence with its reason.
pub(super) fn allowed_because(tolerance: &Tolerance) -> String {
    let how_much = match tolerance.allowance {
        Allowance::Relative(relative) => format!("{} of the published value", share(relative)),
        Allowance::LastDigit(units) => format!("{} units of the last printed digit", count(units)),
    };
    format!("{how_much}: {}.", tolerance.why)
}

/// The name of the kind of a tolerance and its size, for machines.
pub(super) fn allowance(tolerance: &Tolerance) -> (&'static str, f64) {
    match tolerance.allowance {
        Allowance::Relative(relative) => ("relative", relative),
        Allowance::LastDigit(units) => ("last-digit", units),
    }
}

/// Why a value has failed; empty when it has not.
pub(super) fn reason(outcome: &Outcome) -> String {
    match &outcome.computed {
        Err(reason) => reason.clone(),
        Ok(_) if outcome.passed() => String::new(),
        Ok(_) => "the difference is larger than allowed".to_owned(),
    }
}
