//! What is drawn of a joint: its extent, the loads of the case, and which of the far points are on the drawing.

use super::super::canvas::Spot;
use super::super::view::{Need, on_page};
use crate::analysis::{CaseReport, Report};
use crate::model::{AppliedLoad, Joint, Run, Vector};
use crate::solvers::{State, Ultimate};

/// A load may lie this many sizes of the group outside it and still be drawn in place.
const LOADS_WITHIN: f64 = 1.7;
/// The same for the centre of rotation.
const CENTRE_WITHIN: f64 = 0.65;
/// Length of the longest and shortest load arrow, px.
pub(super) const LENGTHS: (f64, f64) = (84.0, 38.0);
/// Room around a load for its words, px.
const LABEL_ROOM: f64 = 34.0;
/// Up to this many loads each has its own arrow; more are drawn as their resultant.
const MOST_LOADS: usize = 6;
/// Share of the size of the group below which a distance counts as none.
const SAME: f64 = 1e-9;

/// One joint under one case.
#[derive(Debug, Clone, Copy)]
pub(super) struct Subject<'r> {
    pub(super) report: &'r Report,
    pub(super) case: &'r CaseReport,
    /// Least coordinates of the welds, mm.
    pub(super) least: Vector,
    /// Greatest coordinates of the welds, mm.
    pub(super) most: Vector,
}

impl<'r> Subject<'r> {
    pub(super) fn new(report: &'r Report, case: &'r CaseReport) -> Self {
        let infinite = Vector::repeat(f64::INFINITY);
        let (mut least, mut most) = (infinite, -infinite);
        for run in report.joint.group.welds().iter().flat_map(|weld| &weld.runs) {
            for point in extremes(run) {
                least = least.inf(&point);
                most = most.sup(&point);
            }
        }
        Self { report, case, least, most }
    }

    pub(super) fn joint(&self) -> &'r Joint {
        &self.report.joint
    }

    pub(super) fn centroid(&self) -> Vector {
        self.report.section.centroid
    }

    /// Diagonal of the welds' box, mm.
    pub(super) fn size(&self) -> f64 {
        (self.most - self.least).norm()
    }

    /// Half the width of the widest band at the scale of the drawing, mm in both directions.
    pub(super) fn half_band(&self) -> Vector {
        let welds = self.joint().group.welds();
        let widest = welds.iter().map(|weld| weld.size.deformation_size()).fold(0.0, f64::max);
        Vector::new(widest, widest, 0.0) / 2.0
    }

    /// The state that is reported.
    pub(super) fn state(&self) -> Option<&'r State> {
        self.case.ultimate().map(Ultimate::governing)
    }

    /// The centre of rotation.
    pub(super) fn centre(&self) -> Option<Vector> {
        self.state()?.centre.map(|[x, y]| Vector::new(x, y, 0.0))
    }

    /// The centre of rotation, where it is near enough to be drawn in place.
    pub(super) fn near_centre(&self) -> Option<Vector> {
        self.centre().filter(|centre| self.distance(*centre) <= CENTRE_WITHIN * self.size())
    }

    /// The loads of the case as the joint holds them.
    pub(super) fn loads(&self) -> &'r [AppliedLoad] {
        let cases = &self.joint().cases;
        cases.iter().find(|case| case.name == self.case.name).map_or(&[], |case| &case.loads)
    }

    /// Whether every load has its own arrow.
    pub(super) fn draws_each_load(&self) -> bool {
        self.loads().len() <= MOST_LOADS
    }

    /// Whether the load of the case is a force, by the measure in which its strength is told.
    pub(super) fn is_force(&self) -> bool {
        self.case.load_times(1.0).is_some_and(|(_, in_moment)| !in_moment)
    }

    /// Whether a load has a place of its own: a moment alone may have none.
    pub(super) fn has_place(load: &AppliedLoad) -> bool {
        load.placed || load.wrench.force.norm() > 0.0
    }

    /// Whether a load has a place of its own that is near enough to be drawn there.
    pub(super) fn is_in_place(&self, load: &AppliedLoad) -> bool {
        Self::has_place(load) && self.is_near(load.wrench.reference)
    }

    /// Where the moment of a load is drawn.
    pub(super) fn place_of_moment(&self, load: &AppliedLoad) -> Vector {
        if self.is_in_place(load) { load.wrench.reference } else { self.centroid() }
    }

    /// Places of loads that are drawn there, each once; the foot of the resultant where the loads are too many.
    pub(super) fn near_loads(&self) -> Vec<Vector> {
        if !self.draws_each_load() {
            return self.foot().filter(|foot| self.is_near(*foot)).into_iter().collect();
        }
        let mut points: Vec<Vector> = Vec::new();
        for load in self.loads().iter().filter(|load| self.is_in_place(load)) {
            let at = load.wrench.reference;
            if !points.iter().any(|known| self.is_same(*known, at)) {
                points.push(at);
            }
        }
        points
    }

    /// Whether two points are one on the page.
    pub(super) fn is_same(&self, one: Vector, other: Vector) -> bool {
        (one - other).norm() <= SAME * self.size()
    }

    /// Whether a load at a point is drawn there.
    pub(super) fn is_near(&self, at: Vector) -> bool {
        self.distance(at) <= LOADS_WITHIN * self.size()
    }

    /// Distance of a point from the welds' box, mm.
    fn distance(&self, at: Vector) -> f64 {
        let outside = (self.least - at).sup(&(at - self.most)).sup(&Vector::zeros());
        outside.norm()
    }

    /// The foot of the perpendicular from the centroid on the resultant's line of action; `None` without a force,
    /// or where the line passes through the centroid.
    pub(super) fn foot(&self) -> Option<Vector> {
        let (force, moment) = (self.case.load.force, self.case.load.moment.z);
        let eccentricity = moment.abs() / force.norm();
        (self.is_force() && eccentricity > SAME * self.size()).then(|| {
            // r x F = M with r across F: r = (F_y, -F_x) M / F^2.
            self.centroid() + Vector::new(force.y, -force.x, 0.0) * (moment / force.norm_squared())
        })
    }

    /// What must be seen: the welds' box and the centre with room before and after them, the loads with their arrows.
    pub(super) fn needs(&self, before: Spot, after: Spot) -> Vec<Need> {
        let mut needs = vec![
            Need { at: self.least - self.half_band(), before, after },
            Need { at: self.most + self.half_band(), before, after },
        ];
        needs.extend(self.near_centre().map(|at| Need { at, before, after }));
        let around = Spot::new(LABEL_ROOM, LABEL_ROOM);
        for at in self.near_loads() {
            let forces = self.loads().iter().map(|load| load.wrench);
            let there = forces.filter(|load| self.is_same(load.reference, at));
            let mut need = Need { at, before: around, after: around };
            for force in there.map(|load| load.force).chain([self.case.load.force]) {
                if force.norm() > 0.0 {
                    let arrow = on_page(force).normalize() * (LENGTHS.0 + 8.0);
                    need.before = need.before.sup(&-arrow);
                    need.after = need.after.sup(&arrow);
                }
            }
            needs.push(need);
        }
        needs
    }
}

/// Points of a run between which it lies: its ends, and where an arc turns back.
pub(super) fn extremes(run: &Run) -> Vec<Vector> {
    let mut points = vec![run.point(0.0), run.point(1.0)];
    if let Run::Arc { centre, radius, start, sweep } = run {
        for quarter in 0..4 {
            let angle = f64::from(quarter) * std::f64::consts::FRAC_PI_2;
            let from = if *sweep > 0.0 { angle - start } else { start - angle };
            if from.rem_euclid(std::f64::consts::TAU) < sweep.abs() {
                points.push(centre + Vector::new(angle.cos(), angle.sin(), 0.0) * *radius);
            }
        }
    }
    points
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::f64::consts::{FRAC_PI_2, PI};

    #[test]
    fn an_arc_reaches_to_where_it_turns_back() {
        let arc = Run::arc(Vector::zeros(), 10.0, -0.1, PI).unwrap();
        let points = extremes(&arc);
        let most = points.iter().fold(Vector::repeat(-1e9), |most, point| most.sup(point));
        let least = points.iter().fold(Vector::repeat(1e9), |least, point| least.inf(point));
        assert!((most - Vector::new(10.0, 10.0, 0.0)).norm() < 1e-9, "{most}");
        assert!((least.y - 10.0 * (-0.1_f64).sin()).abs() < 1e-9);
        let back = Run::arc(Vector::zeros(), 10.0, FRAC_PI_2, -PI).unwrap();
        assert!(extremes(&back).iter().any(|point| (point.x - 10.0).abs() < 1e-9));
        assert!(!extremes(&back).iter().any(|point| point.x < -9.0));
    }
}
