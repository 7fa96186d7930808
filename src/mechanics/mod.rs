//! What a given motion produces: line properties, displacements, strength, resultant, rupture.

mod cells;
pub mod law;
mod panels;
mod plane;
mod response;
mod resultant;
mod rupture;
mod section;
mod table_law;

pub use cells::{Cell, LocalState};
pub use panels::Quadrature;
pub use plane::{Piece, PlaneGroup, PointElement, Shape, Triple, along_and_across, cell_count, displacement};
pub use resultant::Resultant;
pub use rupture::Utmost;
pub use section::Section;
