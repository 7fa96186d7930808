//! Elastic vector method: welds as lines of linear, direction-blind stiffness proportional to their throat.
//!
//! About the throat-weighted centroid translation and rotation decouple, so the stress on the throat at r is
//!
//! `tau(r) = F / A + (M / J) z x r`, and `lambda = min over the weld of F_l / |tau|`
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | A, J | `Section` | mm^2, mm^4 | throat area and polar moment |
//! | F_l | `strength` | MPa | longitudinal strength per throat area, 0.60 F_EXX in most codes |
//! | tau | `stress_motion` | MPa | field v + omega x (x - c) |
//!
//! This is the textbook sum of `P/A` and `T r/J`; the product of inertia does not enter in the plane.
//! |tau| grows with the distance from the elastic centre, so its maximum lies at the end of a straight run, and
//! on an arc at an end or at the point farthest from that centre. Source: the vector method of the handbooks,
//! for example AISC Manual Part 8.

use super::outcome::{Elastic, ElasticPeak, Motion, Place};
use crate::mechanics::{PlaneGroup, Triple, displacement};
use crate::model::{Vector, WeldGroup};

/// Solves the group elastically for a load (F_x, F_y, M / rho) about its centroid; `None` for a load that is zero
/// or vanishes beside the strength (rounding of loads that cancel).
#[must_use]
pub fn elastic(group: &PlaneGroup, welds: &WeldGroup, longitudinal: f64, load: &Triple) -> Option<Elastic> {
    let stress = load / group.section.throat_area;
    let mut worst: Option<(f64, ElasticPeak)> = None;
    for piece in &group.pieces {
        let weld = &welds.welds()[piece.weld];
        let strength = longitudinal * weld.filler.strength;
        for at in piece.farthest(&stress, piece.range()) {
            let tau = displacement(&stress, &at);
            let ratio = tau.norm() / strength;
            if ratio > worst.map_or(0.0, |(known, _)| known) {
                let place = Place { weld: piece.weld, run: piece.run, at: group.unscaled(at) };
                let force_per_length = Vector::new(tau.x, tau.y, 0.0) * weld.total_throat();
                worst = Some((ratio, ElasticPeak { place, force_per_length }));
            }
        }
    }
    let (ratio, critical) = worst?;
    let load_factor = 1.0 / ratio;
    let stress_motion = Motion::of(group, &stress);
    (load_factor < NO_LOAD).then_some(Elastic { load_factor, critical, stress_motion })
}

/// Load factor from which a load counts as none.
const NO_LOAD: f64 = 1e15;
