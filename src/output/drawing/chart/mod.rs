//! A sweep as a drawing: curves over one variable, maps over two.
//!
//! | part | file |
//! |---|---|
//! | one variable: strength, ratio and utilisation below each other | `curves.rs` |
//! | two variables: four maps with contours | `maps.rs` |
//! | one quantity along a variable | `quantity.rs` |
//! | regions and lines of values on a grid | `field.rs` |
//! | one plot: frame, ticks, curves by plotters | `plot.rs`, `pen.rs` |
//! | what the drawing says in words | `notes.rs` |
//!
//! Every point drawn is a point solved. Between points curves are straight and maps linear, except where the
//! strength jumps: there curves are broken, and on maps each point's value reaches half way.

mod curves;
mod field;
mod maps;
mod notes;
mod pen;
mod plot;
mod quantity;

use super::canvas::Canvas;
use crate::study::sweep::Sweep;

/// A sweep as an SVG drawing.
#[must_use]
pub fn sweep_svg(sweep: &Sweep) -> String {
    let canvas = drawn(sweep);
    let description = format!(
        "{}. Strength of the weld group by the ultimate and the elastic method, their ratio, and the utilisation.",
        notes::subject(sweep)
    );
    canvas.finish(&sweep.joint.title, &description)
}

fn drawn(sweep: &Sweep) -> Canvas {
    match sweep.variables.as_slice() {
        [across, up] => maps::drawn(sweep, across, up),
        [variable, ..] => curves::drawn(sweep, variable),
        [] => Canvas::new(1.0, 1.0),
    }
}
