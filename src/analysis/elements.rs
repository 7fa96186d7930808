//! The element table: both methods cell by cell, at the given load, so that each column sums to the load.

use super::{CellForce, ElementRow};
use crate::mechanics::{Cell, PlaneGroup, Quadrature, Triple};
use crate::model::{Discretisation, Joint, Vector};
use crate::solvers::{Elastic, Motion, State};

/// Cells on the longest run when the weld is continuous.
const CELLS: usize = 20;
/// Nodes a panel for the cell integrals: as fine as the solution itself.
const POINTS: u16 = 12;
/// Nodes for the elastic cell integrals: exact to rounding for a cell that is a whole turn of an arc.
const ELASTIC_POINTS: u16 = 24;

/// The rows of one case; `state` is the governing state of the ultimate analysis, where there is one.
pub(super) fn rows(
    joint: &Joint,
    group: &PlaneGroup,
    state: Option<&State>,
    elastic: &Elastic,
) -> Vec<ElementRow> {
    let count = match joint.discretisation {
        Discretisation::Continuous => CELLS,
        Discretisation::Elements(count) => count,
    };
    let quadrature = Quadrature::fine(POINTS);
    let cells = group.cells(&joint.group, count);
    let elastic_quadrature = Quadrature::fine(ELASTIC_POINTS);
    let stress = scaled(&elastic.stress_motion, group);
    let rupture = state.map(|state| (scaled(&state.motion, group), state.load_factor));
    let row = |cell: &Cell| {
        let weld = &joint.group.welds()[cell.weld];
        let throat = weld.total_throat();
        let wrench = group.cell_of_linear_field(cell, &stress, throat, &elastic_quadrature);
        let (middle, greatest) = group.linear_field_in(cell, &stress);
        let ultimate = rupture.map(|(q, load_factor)| {
            let wrench = group.cell_wrench(cell, &q, &quadrature) / load_factor;
            let local = group.local_state(cell, &q);
            (local, force(group, &wrench, local.force_per_length / load_factor))
        });
        let strength = joint.rules.longitudinal.value * weld.filler.strength;
        ElementRow {
            weld: cell.weld,
            run: group.pieces[cell.piece].run,
            element: cell.number,
            at: cell.at,
            length: cell.length,
            angle: ultimate.map(|(local, _)| local.angle),
            deformation: ultimate.and_then(|(local, _)| local.ratio.map(|_| local.deformation)),
            deformation_ratio: ultimate.and_then(|(local, _)| local.ratio),
            ultimate: ultimate.map(|(_, force)| force),
            elastic: force(group, &wrench, middle * throat),
            elastic_ratio: greatest / strength * elastic.load_factor,
        }
    };
    cells.iter().map(row).collect()
}

fn scaled(motion: &Motion, group: &PlaneGroup) -> Triple {
    Triple::new(motion.translation[0], motion.translation[1], motion.rotation * group.gyration)
}

fn force(group: &PlaneGroup, wrench: &Triple, force_per_length: f64) -> CellForce {
    CellForce {
        force: Vector::new(wrench.x, wrench.y, 0.0),
        moment: Vector::new(0.0, 0.0, wrench.z * group.gyration),
        force_per_length,
    }
}
