//! From the joint's plane to the page: one scale for both directions, y turned from up to down.
//!
//! What must be seen is a list of [`Need`]s: points of the joint, each with room around it in px. The scale is
//! the largest at which all fit the frame; the needed width `max(s x + right) - min(s x - left)` grows with s, so it
//! is found by bisection.

use super::canvas::{Area, Spot};
use crate::model::Vector;

/// A point that must be seen, with room around it, px.
#[derive(Debug, Clone, Copy)]
pub(super) struct Need {
    /// The point, mm.
    pub(super) at: Vector,
    /// Room to the left and above.
    pub(super) before: Spot,
    /// Room to the right and below.
    pub(super) after: Spot,
}

/// A point of the plane on the page.
#[derive(Debug, Clone, Copy)]
pub(super) struct View {
    /// px to the mm.
    pub(super) scale: f64,
    /// A point of the joint, mm: coordinates are taken from it, so that joints far from the origin lose no digits.
    about: Vector,
    /// Where that point is on the page.
    origin: Spot,
}

/// Halvings of the logarithm of the scale.
const HALVINGS: u32 = 60;
/// Smallest and largest scale, px/mm.
const SCALES: (f64, f64) = (1e-9, 1e6);

impl View {
    /// The view with the largest scale at which all needs fit the frame, in its middle.
    pub(super) fn fit(needs: &[Need], about: Vector, frame: &Area) -> Self {
        let room = frame.size();
        let (mut low, mut high) = (SCALES.0.ln(), SCALES.1.ln());
        for _ in 0..HALVINGS {
            let middle = 0.5 * (low + high);
            let used = extent(needs, about, middle.exp()).size();
            if used.x <= room.x && used.y <= room.y { low = middle } else { high = middle }
        }
        let scale = low.exp();
        let used = extent(needs, about, scale);
        Self { scale, about, origin: frame.middle() - used.middle() }
    }

    /// Where a point of the joint is on the page.
    pub(super) fn spot(&self, at: Vector) -> Spot {
        self.origin + on_page(at - self.about) * self.scale
    }
}

/// A direction of the joint as one of the page.
pub(super) fn on_page(direction: Vector) -> Spot {
    Spot::new(direction.x, -direction.y)
}

/// The part of an endless page that the needs take at a scale.
fn extent(needs: &[Need], about: Vector, scale: f64) -> Area {
    let mut all = Area::new(f64::INFINITY, f64::INFINITY, f64::NEG_INFINITY, f64::NEG_INFINITY);
    for need in needs {
        let spot = on_page(need.at - about) * scale;
        all.least = all.least.inf(&(spot - need.before));
        all.most = all.most.sup(&(spot + need.after));
    }
    all
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn needs_fill_the_frame_and_stay_within() {
        let room = Spot::new(10.0, 20.0);
        let need = |x: f64, y: f64| Need { at: Vector::new(x, y, 0.0), before: room, after: room };
        let frame = Area::new(100.0, 50.0, 500.0, 350.0);
        for size in [1e-2, 1.0, 5000.0, 1e8] {
            let far = 1e6 * size;
            let about = Vector::new(far, far, 0.0);
            let view = View::fit(&[need(far, far), need(far + size, far + 3.0 * size)], about, &frame);
            let (a, b) = (view.spot(about), view.spot(about + Vector::new(size, 3.0 * size, 0.0)));
            // The height governs: 300 less 40 px for three sizes.
            assert!((a.y - 330.0).abs() < 1e-3 && (b.y - 70.0).abs() < 1e-3, "{a} {b}");
            assert!((0.5 * (a.x + b.x) - 300.0).abs() < 1e-3);
        }
    }
}
