//! An expression as a list of steps in the order of evaluation, each with its place in the text.
//!
//! Steps keep evaluation free of recursion: `grammar` makes them from a text, `evaluate` runs them on a stack.

use super::faults::Span;
use super::quantity::{Quantity, unit};

/// The functions of expressions.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Function {
    /// Square root.
    Sqrt,
    /// Absolute value.
    Abs,
    /// Least of several.
    Min,
    /// Greatest of several.
    Max,
    /// Sine.
    Sin,
    /// Cosine.
    Cos,
    /// Tangent.
    Tan,
}

/// Names of the functions.
pub(super) const FUNCTIONS: [(&str, Function); 7] = [
    ("sqrt", Function::Sqrt),
    ("abs", Function::Abs),
    ("min", Function::Min),
    ("max", Function::Max),
    ("sin", Function::Sin),
    ("cos", Function::Cos),
    ("tan", Function::Tan),
];

/// What one step does with the stack of values.
#[derive(Debug, Clone, PartialEq)]
pub(super) enum Action {
    /// Pushes a quantity.
    Push(Quantity),
    /// Pushes the value of a parameter.
    Parameter(String),
    /// Adds the two on top.
    Add,
    /// Subtracts the top from the one below.
    Subtract,
    /// Multiplies the two on top.
    Multiply,
    /// Divides the one below by the top.
    Divide,
    /// Changes the sign of the top.
    Negate,
    /// Raises the top to a power.
    Power(i32),
    /// Calls a function on this many values.
    Call(Function, usize),
}

/// A step and the part of the text it computes.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Step {
    /// What it does.
    pub(super) action: Action,
    /// The text of its result.
    pub(super) span: Span,
}

/// The names an expression refers to.
pub(super) fn names(steps: &[Step]) -> impl Iterator<Item = &str> {
    steps.iter().filter_map(|step| match &step.action {
        Action::Parameter(name) => Some(name.as_str()),
        Action::Push(_)
        | Action::Add
        | Action::Subtract
        | Action::Multiply
        | Action::Divide
        | Action::Negate
        | Action::Power(_)
        | Action::Call(..) => None,
    })
}

/// Whether a name belongs to a unit or a function.
pub(super) fn is_reserved(name: &str) -> bool {
    unit(name).is_some() || FUNCTIONS.iter().any(|(known, _)| *known == name)
}
