//! Drawings: results to SVG, by one path; a PNG is that SVG rasterised.
//!
//! | file | holds |
//! |---|---|
//! | `canvas.rs` | a page for lines, areas and texts: SVG |
//! | `font.rs` | widths of texts, with the embedded font |
//! | `ink.rs` | colours |
//! | `space.rs` | where on the page there is room for a text |
//! | `view.rs` | from the joint's plane to the page |
//! | `sheet.rs`, `column.rs` | what all pages have in common; the panel beside a drawing |
//! | `arrow.rs`, `count.rs` | arrows; counts as numbers |
//! | `joint/` | a joint under a case |
//! | `chart/` | a sweep: curves and maps |
//! | `png.rs` | SVG to PNG (feature `png`) |
//!
//! Coordinates are in px of a page 1200 px wide. No text overlaps another: what has no room is listed or left out.

mod arrow;
mod canvas;
mod chart;
mod column;
mod count;
mod font;
mod ink;
mod joint;
#[cfg(feature = "png")]
mod png;
mod sheet;
mod space;
mod view;

pub use chart::sweep_svg;
pub use joint::joint_svg;
#[cfg(feature = "png")]
pub use png::{PngError, png};
