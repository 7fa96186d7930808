//! Pure mathematics, with no weld in sight: quadrature, roots and maxima of one variable.

mod gauss;
mod roots;

pub use gauss::GaussLegendre;
pub use roots::{maximise, root};
