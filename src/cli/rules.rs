//! The command `rules`: what can be verified against, and how far each number is confirmed.

use super::args::{RulesArguments, RulesFormat};
use super::destination::Destination;
use super::exit::Exit;
use super::source::fault;
use super::{VERSION, colour, message};
use weldpole::diagnostic::Diagnostic;
use weldpole::input::catalog;
use weldpole::model::{Law, RuleSet};
use weldpole::output::{Layout, law_text, rule_set_text, rules_json, rules_text};

/// Lists everything, or shows the one rule set or law asked for.
pub(super) fn run(arguments: &RulesArguments) -> Exit {
    let destination = Destination::from(arguments.output.as_ref());
    let layout = colour::layout(arguments.width, false, &destination);
    let outcome = chosen(arguments.id.as_deref()).and_then(|(sets, laws)| match arguments.format {
        RulesFormat::Json => destination.write(rules_json(VERSION, sets, laws)),
        RulesFormat::Text => destination.write_text(&text(arguments.id.is_some(), sets, laws, &layout)),
    });
    match outcome {
        Ok(()) => Exit::Satisfied,
        Err(refusal) => {
            message::refuse(&refusal, layout.columns());
            Exit::NoAnswer
        }
    }
}

/// Everything, or what has this id.
fn chosen(id: Option<&str>) -> Result<(&'static [RuleSet], &'static [Law]), Box<Diagnostic>> {
    let (sets, laws) = (catalog::rule_sets(), catalog::laws());
    let Some(id) = id else { return Ok((sets, laws)) };
    if let Some(set) = sets.iter().find(|set| set.id == id) {
        return Ok((std::slice::from_ref(set), &[]));
    }
    if let Some(law) = laws.iter().find(|law| law.id == id) {
        return Ok((&[], std::slice::from_ref(law)));
    }
    let ids = sets.iter().map(|set| set.id.as_str()).chain(laws.iter().map(|law| law.id.as_str()));
    Err(Box::new(Diagnostic {
        accepted: Some(ids.collect::<Vec<_>>().join(", ")),
        ..*fault(id, &format!("there is no rule set or law `{id}`"), Some("`weldpole rules` lists them"))
    }))
}

fn text(one: bool, sets: &[RuleSet], laws: &[Law], layout: &Layout) -> String {
    if one {
        let sets = sets.iter().map(|set| rule_set_text(set, layout));
        sets.chain(laws.iter().map(|law| law_text(law, layout))).collect()
    } else {
        rules_text(sets, laws, layout)
    }
}
