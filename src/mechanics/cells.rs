//! Cells in which the forces along the weld are reported.
//!
//! Each run is cut into equal cells, about as long everywhere as those of the longest run. On the continuous
//! weld a cell's force is its integral, so the cells sum to the resultant; with mid-point elements a cell is an
//! element and its force acts at the middle.
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | - | `Cell::range` | scaled length or rad | the part of the piece the cell covers |
//! | r | [`LocalState::force_per_length`] | N/mm | strength used per length at the middle, all sides |

use super::law::{Direction, response, rupture_limit};
use super::panels::{Panels, Quadrature};
use super::plane::{PlaneGroup, Triple, along_and_across, as_float, cell_count, displacement};
use super::resultant::Resultant;
use crate::model::{Run, Vector, WeldGroup};
use nalgebra::Vector2;

/// A part of a run.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Cell {
    /// Index of the piece in the plane group.
    pub piece: usize,
    /// Index of the cell in the group, in order.
    pub index: usize,
    /// Index of the weld.
    pub weld: usize,
    /// Number of the cell in its weld, from 1.
    pub number: usize,
    /// Middle, mm.
    pub at: Vector,
    /// Length, mm.
    pub length: f64,
    range: (f64, f64),
}

/// What happens at the middle of a cell.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LocalState {
    /// Angle between displacement and weld axis, rad.
    pub angle: f64,
    /// Displacement, mm.
    pub deformation: f64,
    /// Displacement over its rupture limit; `None` for a law without limit.
    pub ratio: Option<f64>,
    /// Force per length, all sides, N/mm.
    pub force_per_length: f64,
}

impl PlaneGroup {
    /// The cells of the group, `count` on the longest run.
    #[must_use]
    pub fn cells(&self, group: &WeldGroup, count: usize) -> Vec<Cell> {
        let longest = group.longest_run();
        let mut cells = Vec::new();
        let mut piece = 0;
        for (weld_index, weld) in group.welds().iter().enumerate() {
            let mut number = 0;
            for run in &weld.runs {
                let parts = cell_count(run, count, longest);
                for k in 0..parts {
                    number += 1;
                    let share = |k: usize| as_float(k) / as_float(parts);
                    let (from, to) =
                        (self.parameter(piece, run, share(k)), self.parameter(piece, run, share(k + 1)));
                    cells.push(Cell {
                        piece,
                        index: cells.len(),
                        weld: weld_index,
                        number,
                        at: run.point((as_float(k) + 0.5) / as_float(parts)),
                        length: run.length() / as_float(parts),
                        range: (from.min(to), from.max(to)),
                    });
                }
                piece += 1;
            }
        }
        cells
    }

    /// The piece's parameter at a share of its run.
    fn parameter(&self, piece: usize, run: &Run, share: f64) -> f64 {
        let (low, high) = self.pieces[piece].range();
        match run {
            Run::Straight { .. } => high * share,
            Run::Arc { sweep, .. } if *sweep > 0.0 => low + (high - low) * share,
            Run::Arc { .. } => high - (high - low) * share,
        }
    }

    /// The wrench (F_x, F_y, M / rho) of one cell under a motion, about the weld centroid.
    #[must_use]
    pub fn cell_wrench(&self, cell: &Cell, q: &Triple, quadrature: &Quadrature) -> Triple {
        let mut sum = Resultant::default();
        if let Some(element) = self.elements.get(cell.index) {
            sum.add(self, q, &element.at, &element.tangent, element.strength, element.size);
            return sum.wrench;
        }
        let piece = &self.pieces[cell.piece];
        sum.integrate(self, piece, cell.range, q, quadrature, &mut Panels::default());
        sum.wrench
    }

    /// What happens at the middle of a cell under a motion.
    #[must_use]
    pub fn local_state(&self, cell: &Cell, q: &Triple) -> LocalState {
        let piece = &self.pieces[cell.piece];
        let (at, tangent) = piece.frame(0.5 * (cell.range.0 + cell.range.1));
        let u = displacement(q, &at);
        let deformation = u.norm();
        let (along, across) = along_and_across(&u, &tangent);
        let direction = Direction::of(along, across);
        let angle = direction.angle;
        let limit = rupture_limit(&self.law, angle);
        let moves = deformation > 0.0;
        let share =
            if moves { response(&self.law, &direction, deformation / piece.size).strength } else { 0.0 };
        LocalState {
            angle,
            deformation,
            ratio: limit.map(|(limit, _)| deformation / (limit * piece.size)),
            force_per_length: share * piece.strength / self.gyration,
        }
    }

    /// The integral over a cell of a linear field `v + omega x r` (per throat area), times the throat (mm):
    /// (F_x, F_y, M / rho). The integrand is quadratic on a straight run, and on an arc a product of two sines over at
    /// most one turn, for which one panel of 24 nodes is enough: only the nodes of `quadrature` are used.
    #[must_use]
    pub fn cell_of_linear_field(
        &self,
        cell: &Cell,
        field: &Triple,
        throat: f64,
        quadrature: &Quadrature,
    ) -> Triple {
        let piece = &self.pieces[cell.piece];
        let (low, high) = cell.range;
        let (middle, half) = (0.5 * (low + high), 0.5 * (high - low));
        let factor = throat * piece.stretch() * self.gyration * half;
        let mut sum = Triple::zeros();
        for (x, weight) in quadrature.rule.iter() {
            let (at, _) = piece.frame(middle + half * x);
            let u = displacement(field, &at);
            sum += Triple::new(u.x, u.y, at.perp(&u)) * (weight * factor);
        }
        sum
    }

    /// The size of a linear field at the middle of a cell, and the greatest within it.
    #[must_use]
    pub fn linear_field_in(&self, cell: &Cell, field: &Triple) -> (f64, f64) {
        let piece = &self.pieces[cell.piece];
        let size = |at: &Vector2<f64>| displacement(field, at).norm();
        let greatest = piece.farthest(field, cell.range).iter().map(size).fold(0.0, f64::max);
        (size(&piece.frame(0.5 * (cell.range.0 + cell.range.1)).0), greatest)
    }
}
