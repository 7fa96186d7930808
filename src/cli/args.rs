//! The arguments: commands, options and their help.

use super::figure;
use clap::{Args, Parser, Subcommand, ValueEnum};
use std::path::PathBuf;
use weldpole::input::Options;

/// Shown by `--help`: what the program is for and what it leaves to the reader.
const ABOUT: &str = "\
Strength of eccentrically loaded fillet weld groups by the instantaneous-centre method, beside the elastic \
vector method.

Static strength of fillet welds between parts taken as rigid; no fatigue, brittle fracture, lamellar tearing \
or seismic detailing. Results support, and do not replace, the judgement of a licensed engineer under the code \
in force.";

const EXAMPLES: &str = "\
Examples:
  weldpole check --demo                 verify the built-in demonstration joint
  weldpole new -o bracket.toml          write a commented starter file
  weldpole check bracket.toml           verify it
  weldpole sweep --demo --vary arm=150mm:600mm:10
                                        strength while a parameter varies
  weldpole rules                        list the rule sets and laws
  weldpole selfcheck                    compare the program with published values

Exit status: 0 every verification satisfied; 1 some verification exceeded or rule of detailing
broken; 2 no answer for at least one joint. 2 outweighs 1, 1 outweighs 0.";

const SELFCHECK_EXAMPLES: &str = "\
Examples:
  weldpole selfcheck
  weldpole selfcheck -o selfcheck.txt          the page for a quality file
  weldpole selfcheck --format csv -o selfcheck.csv

Exit status: 0 every published value met within its tolerance; 1 some value not met; 2 the results
cannot be written.";

const CHECK_EXAMPLES: &str = "\
Examples:
  weldpole check bracket.toml
  weldpole check --format json -o results.json joints/*.toml
  weldpole check --set b=140mm --set 'e=b + 250 mm' bracket.toml
  weldpole check --elements 100 --law lesik-kennedy --elements-csv elements.csv bracket.toml
  generator | weldpole check --format csv -

Exit status: 0 every verification satisfied; 1 some verification exceeded or rule of detailing
broken; 2 no answer for at least one joint. 2 outweighs 1, 1 outweighs 0.";

const SWEEP_EXAMPLES: &str = "\
Examples:
  weldpole sweep --demo --vary arm=150mm:600mm:10
  weldpole sweep --vary load.eccentricity=0:600:13 bracket.toml
  weldpole sweep --vary load.angle=-90:0:10 --case hoist bracket.toml
  weldpole sweep --vary 'leg=1/4 in:1/2 in:5' --vary 'reach=5 in:20 in:16' --format csv bracket.toml

FROM and TO follow the rules of --set; those of the load may be bare numbers in the file's units.
load.eccentricity is the distance of the resultant from the centroid of the welds, positive on the
side given in the file; load.angle is its angle from the x axis, each force turned about its point.

Exit status: 0 satisfied at every point; 1 exceeded at some; 2 no answer at some, or at all.";

/// The command line.
#[derive(Debug, Parser)]
#[command(name = "weldpole", version, about, long_about = ABOUT, after_help = EXAMPLES, arg_required_else_help = true)]
pub(super) struct Arguments {
    /// What to do.
    #[command(subcommand)]
    pub(super) command: Command,
}

/// What can be asked for.
#[derive(Debug, Subcommand)]
pub(super) enum Command {
    /// Verify joints: ultimate and elastic strength, utilisation, verdict
    #[command(after_help = CHECK_EXAMPLES)]
    Check(CheckArguments),
    /// Vary a parameter or the load: strength by both methods, utilisation, jumps
    #[command(after_help = SWEEP_EXAMPLES)]
    Sweep(SweepArguments),
    /// List rule sets and load-deformation laws, or show one with its clauses and sources
    Rules(RulesArguments),
    /// Compute the published cases held by the program again and compare
    #[command(name = "selfcheck", after_help = SELFCHECK_EXAMPLES)]
    SelfCheck(SelfCheckArguments),
    /// Write a commented starter file
    New(NewArguments),
}

/// Arguments of `check`.
#[derive(Debug, Args)]
#[command(override_usage = "weldpole check [OPTIONS] <FILES>...\n       weldpole check [OPTIONS] --demo")]
pub(super) struct CheckArguments {
    /// Joint files; `-` is standard input
    #[arg(value_name = "FILES", required_unless_present = "demo")]
    pub(super) files: Vec<PathBuf>,
    /// Verify the built-in demonstration joint instead of files
    #[arg(long, conflicts_with = "files")]
    pub(super) demo: bool,
    /// Form of the results
    #[arg(long, value_enum, default_value_t = CheckFormat::Text)]
    pub(super) format: CheckFormat,
    /// Write the results to FILE instead of standard output; `-` is standard output
    #[arg(short, long, value_name = "FILE")]
    pub(super) output: Option<PathBuf>,
    /// Write the element table (forces of every piece of weld) to FILE; with `-` it takes the place of the
    /// results on standard output
    #[arg(long, value_name = "FILE")]
    pub(super) elements_csv: Option<PathBuf>,
    /// Draw the joint: a name that ends in .svg or .png; `-` puts the SVG on standard output in place of the
    /// results
    #[arg(long, value_name = "FILE", value_parser = figure::path)]
    pub(super) figure: Option<PathBuf>,
    /// Load case or combination to draw instead of the governing one
    #[arg(long, value_name = "NAME", requires = "figure")]
    pub(super) case: Option<String>,
    /// What differs from the files.
    #[command(flatten)]
    pub(super) overrides: Overrides,
    /// Show every load case in detail, not the governing one only
    #[arg(long)]
    pub(super) all_cases: bool,
    /// Columns of the text, at least 72 [default: the variable COLUMNS, else 80]
    #[arg(long, value_name = "N", value_parser = clap::value_parser!(u16).range(1..=1000))]
    pub(super) width: Option<u16>,
}

/// What a run takes from the command line in place of the joint file.
#[derive(Debug, Args)]
pub(super) struct Overrides {
    /// Give a parameter of the joint file another value; repeatable
    #[arg(long, value_name = "NAME=VALUE", value_parser = assignment)]
    set: Vec<(String, String)>,
    /// Mid-point elements on the longest run instead of the continuous weld
    #[arg(long, value_name = "N", value_parser = at_least_one)]
    elements: Option<usize>,
    /// Load-deformation law, by its id
    #[arg(long, value_name = "ID")]
    law: Option<String>,
    /// Rule set, by its id
    #[arg(long, value_name = "ID")]
    rules: Option<String>,
}

impl Overrides {
    /// The same for the reader of joint files.
    pub(super) fn options(&self) -> Options {
        Options {
            set: self.set.clone(),
            elements: self.elements,
            law: self.law.clone(),
            rules: self.rules.clone(),
        }
    }
}

/// Arguments of `sweep`.
#[derive(Debug, Args)]
#[command(override_usage = "weldpole sweep [OPTIONS] --vary NAME=FROM:TO:COUNT <FILE>\n       \
                      weldpole sweep [OPTIONS] --vary NAME=FROM:TO:COUNT --demo")]
pub(super) struct SweepArguments {
    /// Joint file; `-` is standard input
    #[arg(value_name = "FILE", required_unless_present = "demo")]
    pub(super) file: Option<PathBuf>,
    /// Sweep the built-in demonstration joint instead of a file
    #[arg(long, conflicts_with = "file")]
    pub(super) demo: bool,
    /// Vary a parameter of the file, `load.eccentricity` or `load.angle` from one value to another in COUNT
    /// values at equal distances; twice for every combination
    #[arg(long, value_name = "NAME=FROM:TO:COUNT", required = true, allow_hyphen_values = true)]
    pub(super) vary: Vec<String>,
    /// Analyse this case or combination alone
    #[arg(long, value_name = "NAME")]
    pub(super) case: Option<String>,
    /// Form of the results
    #[arg(long, value_enum, default_value_t = SweepFormat::Text)]
    pub(super) format: SweepFormat,
    /// Write the results to FILE instead of standard output; `-` is standard output
    #[arg(short, long, value_name = "FILE")]
    pub(super) output: Option<PathBuf>,
    /// Draw the sweep: curves over one variable, maps over two; a name that ends in .svg or .png; `-` puts the SVG
    /// on standard output in place of the results
    #[arg(long, value_name = "FILE", value_parser = figure::path)]
    pub(super) figure: Option<PathBuf>,
    /// What differs from the file.
    #[command(flatten)]
    pub(super) overrides: Overrides,
    /// Columns of the text, at least 72 [default: the variable COLUMNS, else 80]
    #[arg(long, value_name = "N", value_parser = clap::value_parser!(u16).range(1..=1000))]
    pub(super) width: Option<u16>,
}

/// Arguments of `rules`.
#[derive(Debug, Args)]
pub(super) struct RulesArguments {
    /// One rule set or law to show in full
    #[arg(value_name = "ID")]
    pub(super) id: Option<String>,
    /// Form of the list
    #[arg(long, value_enum, default_value_t = RulesFormat::Text)]
    pub(super) format: RulesFormat,
    /// Write to FILE instead of standard output
    #[arg(short, long, value_name = "FILE")]
    pub(super) output: Option<PathBuf>,
    /// Columns of the text, at least 72 [default: the variable COLUMNS, else 80]
    #[arg(long, value_name = "N", value_parser = clap::value_parser!(u16).range(1..=1000))]
    pub(super) width: Option<u16>,
}

/// Arguments of `selfcheck`.
#[derive(Debug, Args)]
pub(super) struct SelfCheckArguments {
    /// Form of the results
    #[arg(long, value_enum, default_value_t = SelfCheckFormat::Text)]
    pub(super) format: SelfCheckFormat,
    /// Write to FILE instead of standard output; `-` is standard output
    #[arg(short, long, value_name = "FILE")]
    pub(super) output: Option<PathBuf>,
    /// Columns of the text, at least 72 [default: the variable COLUMNS, else 80]
    #[arg(long, value_name = "N", value_parser = clap::value_parser!(u16).range(1..=1000))]
    pub(super) width: Option<u16>,
}

/// Arguments of `new`.
#[derive(Debug, Args)]
pub(super) struct NewArguments {
    /// The demonstration joint instead of the commented starter
    #[arg(long)]
    pub(super) demo: bool,
    /// Write to FILE instead of standard output; an existing file is left alone
    #[arg(short, long, value_name = "FILE")]
    pub(super) output: Option<PathBuf>,
    /// Replace an existing file
    #[arg(long)]
    pub(super) force: bool,
}

/// Form of the results of `check`.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(super) enum CheckFormat {
    /// For people
    Text,
    /// For programs: schema weldpole.check/1
    Json,
    /// For spreadsheets: one row per load case
    Csv,
}

/// Form of the results of `sweep`.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(super) enum SweepFormat {
    /// For people
    Text,
    /// For programs: schema weldpole.sweep/1
    Json,
    /// For spreadsheets: one row per point and load case
    Csv,
}

/// Form of the results of `rules`.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(super) enum RulesFormat {
    /// For people
    Text,
    /// For programs
    Json,
}

/// Form of the results of `selfcheck`.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(super) enum SelfCheckFormat {
    /// For people
    Text,
    /// For programs: schema weldpole.selfcheck/1
    Json,
    /// For spreadsheets: one row per published value
    Csv,
}

/// `NAME=VALUE`.
fn assignment(text: &str) -> Result<(String, String), String> {
    let refusal = || "a parameter is set as NAME=VALUE, for example b=140mm".to_owned();
    let (name, value) = text.split_once('=').ok_or_else(refusal)?;
    let (name, value) = (name.trim(), value.trim());
    if name.is_empty() || value.is_empty() {
        return Err(refusal());
    }
    Ok((name.to_owned(), value.to_owned()))
}

/// A count of elements.
fn at_least_one(text: &str) -> Result<usize, String> {
    match text.parse() {
        Ok(count) if count >= 1 => Ok(count),
        Ok(_) | Err(_) => Err("a whole number of at least 1 is accepted".to_owned()),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use clap::CommandFactory;

    #[test]
    fn the_definition_is_consistent() {
        Arguments::command().debug_assert();
    }

    #[test]
    fn an_assignment_needs_a_name_and_a_value() {
        assert_eq!(assignment("b = 140 mm"), Ok(("b".to_owned(), "140 mm".to_owned())));
        assert_eq!(assignment("e=a=b"), Ok(("e".to_owned(), "a=b".to_owned())));
        for refused in ["b", "=3", "b=", ""] {
            assert!(assignment(refused).is_err(), "{refused}");
        }
    }
}
