//! What goes into a law and what comes out: the direction of a displacement, the strength with its derivatives.
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | theta | `Direction::angle` | rad | angle between displacement and weld axis, folded into 0 to pi/2 |
//! | phi | - | rad | direction of the displacement in the plane |
//! | s | `Response::strength` | - | strength over the longitudinal strength |
//! | d | - | - | displacement over the deformation size w |

/// Strength at one point with its derivatives.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Response {
    /// s, strength over longitudinal strength.
    pub strength: f64,
    /// ds/dd.
    pub by_deformation: f64,
    /// ds/dtheta, per rad.
    pub by_angle: f64,
}

/// Direction of a displacement against the weld axis.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Direction {
    /// theta, rad, 0 to pi/2.
    pub angle: f64,
    /// sin theta.
    pub sine: f64,
    /// cos theta.
    pub cosine: f64,
    /// d theta / d phi, phi the direction of the displacement in the plane: +1 or -1, and where theta is folded
    /// at 0 and 90 degrees the mean, 0.
    pub sense: f64,
}

/// Smaller component over displacement below which theta counts as folded.
const ON_THE_FOLD: f64 = 1e-12;

impl Direction {
    /// The direction of the displacement with the given components along and across the weld axis, not both
    /// zero.
    #[must_use]
    #[expect(
        clippy::imprecise_flops,
        reason = "displacements are far from overflow, and hypot costs as much as a power"
    )]
    pub fn of(along: f64, across: f64) -> Self {
        let length = (along * along + across * across).sqrt();
        Self {
            angle: across.abs().atan2(along.abs()),
            sine: (across.abs() / length).min(1.0),
            cosine: (along.abs() / length).min(1.0),
            sense: if along.abs().min(across.abs()) <= ON_THE_FOLD * length {
                0.0
            } else {
                (along * across).signum()
            },
        }
    }
}
