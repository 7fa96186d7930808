//! Computes a published value again: the joint of a case, through the analysis that every joint takes.
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | lambda | `load_factor` | - | multiplies the load P to reach the nominal strength |
//! | C | `coefficient` | kip/in | lambda P / (D l), D the leg in sixteenths of an inch, l the length |
//! | phi C | - | kip/in | the same with the design load factor |
//! | I | - | in^4/in | second moment of the welds over their one throat |
//! | r | - | 1/in | greatest elastic force per length over P |
//! | t | - | mm | t_0 / lambda: throat at which lambda would be 1, t_0 the throat analysed |
//!
//! Filler E70, so that `F_l t = 0.60 x 70 ksi x w / sqrt 2` = 1.8562 kip/in per sixteenth of leg. For a
//! permissible stress the filler is such that `F_l` is that stress. The printed concentric coefficients hold to
//! every digit with the handbook's throat of 0.707 w (1.855875 kip/in per sixteenth) and with no other constant
//! tried, so their C is taken with that throat; all other values stand as the analysis gives them.
//!
//! Source: the definitions of AISC *Steel Construction Manual*, Part 8.

use super::case::PublishedCase;
use super::quantity::{Method, Quantity};
use crate::analysis::{CaseReport, Report, Section, analyse};
use crate::input::catalog;
use crate::model::{
    AppliedLoad, Basis, Discretisation, Document, Filler, FilletSize, Joint, Law, LoadCase, Vector, Weld,
    WeldGroup, Wrench,
};
use crate::units::{Dimension, MM_PER_INCH, UnitSystem};
use std::f64::consts::FRAC_PI_2;

/// Throat over leg in the handbook's concentric coefficients.
const HANDBOOK_THROAT: f64 = 0.707;
/// Sixteenths in an inch: the measure of legs in C.
const SIXTEENTHS: f64 = 16.0;
/// Filler of the handbook's tables and examples.
const FILLER: &str = "E70";
/// Throat analysed where the throat is the answer, mm: any value serves.
const ANY_THROAT: f64 = 1.0;
/// A weld is integrated as `weldpole check` does it unasked.
pub(super) const DISCRETISATION: Discretisation = Discretisation::Continuous;

impl PublishedCase {
    /// Identifier of the rule set it is computed under.
    #[must_use]
    pub fn rules(&self) -> &'static str {
        match self.quantity {
            Quantity::LoadAsd => "aisc-360-22-asd",
            Quantity::Throat => "nominal",
            Quantity::Coefficient
            | Quantity::DesignCoefficient
            | Quantity::InertiaX
            | Quantity::InertiaY
            | Quantity::InertiaPolar
            | Quantity::LineForce
            | Quantity::LoadLrfd => "aisc-360-22-lrfd",
        }
    }

    /// The joint, as a joint file would give it: one weld of one size, one load.
    ///
    /// # Errors
    /// Dimensions the model refuses, in words.
    pub fn joint(&self, law: &Law) -> Result<Joint, String> {
        let refused = |error: crate::model::ModelError| error.to_string();
        let rules = catalog::rule_set(self.rules()).ok_or("its rule set is not shipped")?;
        let (size, filler) = match self.stress {
            Some(stress) => (
                FilletSize::from_throat(ANY_THROAT, FRAC_PI_2).map_err(refused)?,
                Filler::new(None, stress / rules.longitudinal.value).map_err(refused)?,
            ),
            None => {
                let electrode = catalog::electrode(FILLER).ok_or("its filler metal is not shipped")?;
                (
                    FilletSize::from_legs([self.leg; 2], FRAC_PI_2).map_err(refused)?,
                    Filler::new(Some(electrode.class.clone()), electrode.strength).map_err(refused)?,
                )
            }
        };
        let weld = Weld {
            name: self.shape.name().to_owned(),
            runs: self.shape.runs(self.k, self.length).map_err(refused)?,
            size,
            filler,
            sides: 1,
            plates: Vec::new(),
            set: None,
        };
        let group = WeldGroup::new(vec![weld]).map_err(refused)?;
        let at = Section::of(&group).centroid + Vector::new(self.a * self.length, 0.0, 0.0);
        let (sine, cosine) = self.load_angle_deg.to_radians().sin_cos();
        let force = Vector::new(sine, cosine, 0.0) * self.load;
        let wrench = Wrench::new(at, force, Vector::zeros()).map_err(refused)?;
        let load = AppliedLoad { case: self.id.clone(), factor: 1.0, placed: true, wrench };
        Ok(Joint {
            file: self.id.clone(),
            title: self.id.clone(),
            units: self.units,
            rules: rules.clone(),
            law: law.clone(),
            discretisation: DISCRETISATION,
            filler: None,
            plates: Vec::new(),
            group,
            cases: vec![LoadCase::new(self.id.clone(), vec![load])],
            combined: false,
            unused_cases: Vec::new(),
            document: Document::default(),
        })
    }

    /// The value computed, in the unit of the printed one.
    ///
    /// # Errors
    /// Why there is none, in words.
    pub(super) fn computed(&self, law: &Law) -> Result<f64, String> {
        let report = analyse(&self.joint(law)?);
        let [case] = report.cases.as_slice() else { return Err("the joint has not one load case".into()) };
        let value = match self.method {
            Method::InstantaneousCentre => self.instantaneous_centre(case, &report),
            Method::Concentric => self.concentric(case, &report),
            Method::Elastic => self.elastic(case, &report),
        }?;
        if value.is_finite() { Ok(value) } else { Err("the value is not finite".to_owned()) }
    }

    fn instantaneous_centre(&self, case: &CaseReport, report: &Report) -> Result<f64, String> {
        if let Some(failure) = case.not_solved() {
            return Err(failure.to_string());
        }
        let strength = case.ultimate_strength(&report.joint).ok_or("there is no ultimate strength")?;
        self.coefficient(strength.load_factor, strength.design_load_factor)
    }

    fn concentric(&self, case: &CaseReport, report: &Report) -> Result<f64, String> {
        let mut rules = case.checks.iter().filter(|check| check.basis == Basis::Concentric);
        let (Some(check), None) = (rules.next(), rules.next()) else {
            return Err("not exactly one rule for loads through the centroid applies".to_owned());
        };
        let throat = report.joint.group.welds()[0].size.throat();
        let coefficient = self.coefficient(check.load_factor, Some(check.design_load_factor))?;
        Ok(coefficient * HANDBOOK_THROAT * self.leg / throat)
    }

    /// `C = lambda P / (D l)`, kip/in.
    fn coefficient(&self, load_factor: f64, design_load_factor: Option<f64>) -> Result<f64, String> {
        let factor = if self.quantity == Quantity::DesignCoefficient {
            design_load_factor.ok_or("the rule set gives this method no design strength")?
        } else {
            load_factor
        };
        let leg = SIXTEENTHS * self.leg / MM_PER_INCH;
        Ok(UnitSystem::Us.shown(Dimension::LineForce, factor * self.load / (leg * self.length)))
    }

    fn elastic(&self, case: &CaseReport, report: &Report) -> Result<f64, String> {
        let elastic = case.elastic().ok_or("the load is zero")?;
        let strength = case.elastic_strength(&report.joint).ok_or("the load is zero")?;
        let design = strength.design_load_factor.ok_or("there is no design strength")?;
        let (section, throat) = (&report.section, report.joint.group.welds()[0].size.throat());
        let cubic_inches = |value: f64| value / throat / MM_PER_INCH.powi(3);
        Ok(match self.quantity {
            Quantity::InertiaX => cubic_inches(section.i_x),
            Quantity::InertiaY => cubic_inches(section.i_y),
            Quantity::InertiaPolar => cubic_inches(section.j),
            Quantity::LineForce => elastic.critical.force_per_length.norm() / self.load * MM_PER_INCH,
            Quantity::LoadLrfd | Quantity::LoadAsd => {
                UnitSystem::Us.shown(Dimension::Force, design * self.load)
            }
            Quantity::Throat => throat / strength.load_factor,
            Quantity::Coefficient | Quantity::DesignCoefficient => {
                return Err("the elastic method has no coefficient here".to_owned());
            }
        })
    }
}
