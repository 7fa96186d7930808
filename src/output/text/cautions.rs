//! What every answer leaves out, said once at the end of the text.

use crate::output::layout::{Emphasis, Layout};
use crate::output::table::hanging;

/// The limits of the model.
const CAUTIONS: [&str; 5] = [
    "Static strength of fillet welds only: fatigue, brittle fracture, lamellar tearing and seismic detailing \
     are not covered.",
    "The connected parts are taken as rigid; a part that bends or stretches loads the weld unevenly.",
    "A fillet on one side only must not be bent about its root.",
    "No directional increase applies to welds on the walls of hollow sections (HSS).",
    "The filler metal must match or undermatch the base metal as the code requires.",
];

/// Whom the results defer to.
const DEFERENCE: &str = "These results support, and do not replace, the judgement of a licensed engineer \
                         working under the code in force where the structure stands.";

/// The closing block.
pub(in crate::output) fn text(layout: &Layout) -> String {
    let mut block = (layout.paint)(Emphasis::Heading, "Limits of this calculation") + "\n";
    for caution in CAUTIONS {
        block.push_str(&hanging("  - ", caution, layout.columns()));
    }
    block.push_str(&hanging("", DEFERENCE, layout.columns()));
    block
}
