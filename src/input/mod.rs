//! Joint file to model: text -> document -> schema -> parameters -> joint, with all faults in one run.
//!
//! | stage | file | from | to |
//! |---|---|---|---|
//! | document | `document` | text | tables, keys and values with their places |
//! | schema | `schema` | document | a mirror of the file; numbers and expressions still unevaluated |
//! | parameters | `parameters` | `[parameters]`, `--set` | values of the named quantities |
//! | check | `check` | schema, parameters | [`Joint`] |
//!
//! [`Template`] keeps what the first two stages found and repeats the others with other values of parameters;
//! [`Variable`] is what `--vary` asks for.
//!
//! Beside them: `lexer`, `grammar`, `literal`, `expression`, `evaluate`, `quantity`, `dimension` (numbers with
//! units), `field` and `fields` (values and keys of a table), `faults` (the list), `nearest` (hints), and
//! [`catalog`] (what the program ships).
//!
//! Nothing here reads a file or the environment: the caller hands over the text and the overrides.

pub mod catalog;
mod check;
mod dimension;
mod document;
mod evaluate;
mod expression;
mod faults;
mod field;
mod fields;
mod grammar;
mod lexer;
mod literal;
mod nearest;
mod parameters;
mod quantity;
mod schema;
mod template;
mod variable;

use crate::diagnostic::Diagnostic;
use crate::model::Joint;
pub use template::Template;
pub use variable::{MOST_POINTS, Target, Variable};

/// Overrides of a joint file from the command line.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct Options {
    /// Parameters with their new text: a quantity, an expression or a pure number. Of a name given twice the
    /// last text holds.
    pub set: Vec<(String, String)>,
    /// Mid-point elements on the longest run.
    pub elements: Option<usize>,
    /// Identifier of the law.
    pub law: Option<String>,
    /// Identifier of the rule set.
    pub rules: Option<String>,
}

/// Reads a joint file; `file` is its name, for messages and the default title.
///
/// # Errors
/// Every fault of the file and the overrides, at least one, in the order of the file.
pub fn read_joint(file: &str, text: &str, options: &Options) -> Result<Joint, Vec<Diagnostic>> {
    Template::read(file, text, options).map(Template::into_joint)
}
