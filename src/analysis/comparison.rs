//! Questions a reader asks of a report: how strong by each method, which is greater, does the joint hold.
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | lambda | `load_factor` | - | multiplies the given load to reach the nominal strength |
//! | lambda_d | `design_load_factor` | - | the same for the design strength |
//! | U | `utilisation` | - | 1 / lambda_d |
//!
//! The firewall: where the rule set does not accept the ultimate analysis, its design strength and utilisation
//! do not exist for any writer. Which analysis is accepted is told by [`Joint::accepts`] alone.

use super::{Analyses, CaseReport, Check, Demand, Grade, Report, Status};
use crate::model::{Basis, Joint, Run, WeldGroup};
use crate::solvers::{Elastic, NotSolved, Ultimate};

/// What one method says about the strength of the group under the load of one case.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Strength {
    /// Load factor to the nominal strength.
    pub load_factor: f64,
    /// Load factor to the design strength; `None` where the rule set does not accept the method.
    pub design_load_factor: Option<f64>,
}

impl Strength {
    /// 1 / `design_load_factor`.
    #[must_use]
    pub fn utilisation(&self) -> Option<f64> {
        self.design_load_factor.map(|factor| 1.0 / factor)
    }
}

/// The dimensionless result where one size and filler serve all welds.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Coefficients {
    /// Ultimate resultant over the longitudinal strength of the whole length of weld.
    pub mean_strength: f64,
    /// Handbook coefficient `C = R_n / (D l)`, kip/in: l the longest straight line, all sides counted in R_n, D the leg in sixteenths of an inch, as
    /// for E70 filler; `None` for welds without equal legs.
    pub handbook: Option<f64>,
}

/// The longest straight line of a group, mm: runs that continue each other count as one. The longest run where
/// none is straight.
fn longest_line(group: &WeldGroup) -> f64 {
    let mut longest: f64 = 0.0;
    for weld in group.welds() {
        let mut line = 0.0;
        let mut before: Option<&Run> = None;
        for run in &weld.runs {
            let continues = before.is_some_and(|before| {
                let both_straight = matches!((before, run), (Run::Straight { .. }, Run::Straight { .. }));
                both_straight && before.tangent(1.0).dot(&run.tangent(0.0)) > 1.0 - STRAIGHT_ON
            });
            line = if continues { line + run.length() } else { run.length() };
            longest = longest.max(line);
            before = Some(run);
        }
    }
    longest
}

/// Shortfall of the cosine between two directions that still count as one.
const STRAIGHT_ON: f64 = 1e-12;

/// Longitudinal strength of a 1/16 in fillet of E70: `0.60 x 70 ksi x (1/16 in) / sqrt 2`, kip/in.
const KIP_PER_INCH_OF_SIXTEENTH: f64 = 0.60 * 70.0 / 16.0 * std::f64::consts::FRAC_1_SQRT_2;

impl CaseReport {
    /// The answer of the ultimate analysis, if there is one.
    #[must_use]
    pub fn ultimate(&self) -> Option<&Ultimate> {
        match &self.analyses {
            Analyses::Loaded { ultimate: Ok(ultimate), .. } => Some(ultimate),
            Analyses::Loaded { .. } | Analyses::Unloaded => None,
        }
    }

    /// Why the ultimate analysis has no answer, if it has none for a load that is not zero.
    #[must_use]
    pub fn not_solved(&self) -> Option<&NotSolved> {
        match &self.analyses {
            Analyses::Loaded { ultimate: Err(reason), .. } => Some(reason),
            Analyses::Loaded { .. } | Analyses::Unloaded => None,
        }
    }

    /// The answer of the elastic vector method; `None` when the load is zero.
    #[must_use]
    pub fn elastic(&self) -> Option<&Elastic> {
        match &self.analyses {
            Analyses::Loaded { elastic, .. } => Some(elastic),
            Analyses::Unloaded => None,
        }
    }

    /// Utilisation by the verification that decides; 0 without a load, `None` without an answer.
    #[must_use]
    pub fn utilisation(&self) -> Option<f64> {
        match self.analyses {
            Analyses::Unloaded => Some(0.0),
            Analyses::Loaded { .. } => {
                self.verification.as_ref().map(|verification| verification.utilisation)
            }
        }
    }

    /// Strength by the ultimate method.
    #[must_use]
    pub fn ultimate_strength(&self, joint: &Joint) -> Option<Strength> {
        let load_factor = self.ultimate()?.governing().load_factor;
        let accepted = joint.accepts(Basis::Ultimate);
        let design_load_factor = accepted.then(|| load_factor * joint.rules.design.multiplier());
        Some(Strength { load_factor, design_load_factor })
    }

    /// Strength by the elastic vector method.
    #[must_use]
    pub fn elastic_strength(&self, joint: &Joint) -> Option<Strength> {
        let load_factor = self.elastic()?.load_factor;
        Some(Strength {
            load_factor,
            design_load_factor: Some(load_factor * joint.rules.design.multiplier()),
        })
    }

    /// Nominal load factor of the ultimate method over that of the elastic method.
    #[must_use]
    pub fn ultimate_over_elastic(&self) -> Option<f64> {
        Some(self.ultimate()?.governing().load_factor / self.elastic()?.load_factor)
    }

    /// Size of the load that is `factor` times the given one, in the measure of the checks: N, or N mm and
    /// `true` where the load is a moment. `None` when there is no check to take the measure from.
    #[must_use]
    pub fn load_times(&self, factor: f64) -> Option<(f64, bool)> {
        self.demand().map(|demand| (demand.size * factor, demand.in_moment))
    }

    /// Size of the given load in the measure of the checks; `None` when there is no load.
    #[must_use]
    pub fn demand(&self) -> Option<Demand> {
        self.checks.first().map(|check| Demand { size: check.demand, in_moment: check.in_moment })
    }

    /// Strength coefficients, where the load has a force and one weld size and filler serve all welds.
    #[must_use]
    pub fn coefficients(&self, joint: &Joint) -> Option<Coefficients> {
        let weld = joint.group.uniform()?;
        // Where the measure is a moment, a force is what rounding leaves of loads that cancel.
        self.load_times(1.0).filter(|(_, in_moment)| !in_moment)?;
        let resultant = self.load.force.norm() * self.ultimate()?.governing().load_factor;
        let per_length = joint.rules.longitudinal.value * weld.filler.strength * weld.size.throat();
        let length: f64 = joint.group.welds().iter().map(|weld| weld.length() * f64::from(weld.sides)).sum();
        #[allow(clippy::float_cmp)] // equal as given; nothing is computed
        let leg = weld.size.leg().filter(|_| weld.size.legs().is_some_and(|[a, b]| a == b));
        (resultant > 0.0).then(|| Coefficients {
            mean_strength: resultant / (per_length * length),
            handbook: leg
                .map(|_| KIP_PER_INCH_OF_SIXTEENTH * resultant / (per_length * longest_line(&joint.group))),
        })
    }

    /// The check that decides the case.
    #[must_use]
    pub fn governing_check(&self) -> Option<&Check> {
        let id = &self.verification.as_ref()?.check;
        self.checks.iter().find(|check| check.id == *id)
    }
}

impl Check {
    /// Design strength, where the row has one: an ultimate analysis that is information only has none.
    #[must_use]
    pub fn design_resistance(&self) -> Option<f64> {
        self.has_design_strength().then_some(self.resistance)
    }

    /// Utilisation, where the row has one.
    #[must_use]
    pub fn design_utilisation(&self) -> Option<f64> {
        self.has_design_strength().then_some(self.utilisation)
    }

    fn has_design_strength(&self) -> bool {
        self.accepted || self.basis != Basis::Ultimate
    }
}

impl Report {
    /// The case that decides: the one of largest utilisation, or the first that has no answer.
    #[must_use]
    pub fn deciding_case(&self) -> Option<&CaseReport> {
        let unsolved = || self.cases.iter().find(|case| case.status == Status::NotSolved);
        self.governing.and_then(|index| self.cases.get(index)).or_else(unsolved)
    }

    /// The case of this name.
    #[must_use]
    pub fn case(&self, name: &str) -> Option<&CaseReport> {
        self.cases.iter().find(|case| case.name == name)
    }

    /// Whether some rule of detailing is broken.
    #[must_use]
    pub fn breached(&self) -> bool {
        self.findings.iter().any(|finding| finding.grade == Grade::Breach)
    }

    /// Whether the joint holds: no answer for some case is graver than an excess or breach, which is graver
    /// than satisfaction.
    #[must_use]
    pub fn verdict(&self) -> Status {
        let breach = self.breached().then_some(Status::Exceeded);
        self.cases.iter().map(|case| case.status).chain(breach).max().unwrap_or(Status::Satisfied)
    }
}
