//! Roots and maxima of functions of one variable on a bracket.
//!
//! `root` is regula falsi in the Illinois variant with bisection as a safeguard; `maximise` is golden-section
//! search. Both need only values, and both end after a fixed number of steps whatever the function does.
//! Source: Dahlquist and Bjorck, Numerical Methods (1974), 6.4 (Illinois); Kiefer, Proc. AMS 4 (1953) 502.

const STEPS: usize = 100;

/// A root of `f` between `a` and `b`; `None` when `f(a)` and `f(b)` have the same sign or are not finite.
///
/// The bracket is shrunk to a few units in the last place of the larger end.
pub fn root(mut f: impl FnMut(f64) -> f64, a: f64, b: f64) -> Option<f64> {
    let (mut a, mut b) = (a, b);
    let (mut fa, mut fb) = (f(a), f(b));
    if fa == 0.0 {
        return Some(a);
    }
    if fb == 0.0 {
        return Some(b);
    }
    if !(fa.is_finite() && fb.is_finite()) || (fa > 0.0) == (fb > 0.0) {
        return None;
    }
    for step in 0..STEPS {
        let width = (b - a).abs();
        if width <= 4.0 * f64::EPSILON * a.abs().max(b.abs()) {
            break;
        }
        let secant = b - fb * (b - a) / (fb - fa);
        let inside = secant > a.min(b) && secant < a.max(b);
        let x = if inside && step % 4 != 3 { secant } else { 0.5 * (a + b) };
        let fx = f(x);
        if fx == 0.0 || !fx.is_finite() {
            return fx.is_finite().then_some(x);
        }
        if (fx > 0.0) == (fb > 0.0) {
            fa *= 0.5;
        } else {
            a = b;
            fa = fb;
        }
        b = x;
        fb = fx;
    }
    Some(b)
}

/// A local maximum of `f` between `a` and `b`: place and value.
pub fn maximise(mut f: impl FnMut(f64) -> f64, a: f64, b: f64) -> (f64, f64) {
    let inverse_golden = 0.5 * (5.0_f64.sqrt() - 1.0);
    let (mut a, mut b) = (a, b);
    let mut left = b - inverse_golden * (b - a);
    let mut right = a + inverse_golden * (b - a);
    let (mut f_left, mut f_right) = (f(left), f(right));
    for _ in 0..STEPS {
        if (b - a).abs() <= 1e-9 * a.abs().max(b.abs()).max(1e-9) {
            break;
        }
        if f_left >= f_right {
            b = right;
            (right, f_right) = (left, f_left);
            left = b - inverse_golden * (b - a);
            f_left = f(left);
        } else {
            a = left;
            (left, f_left) = (right, f_right);
            right = a + inverse_golden * (b - a);
            f_right = f(right);
        }
    }
    if f_left >= f_right { (left, f_left) } else { (right, f_right) }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn root_of_a_cubic() {
        let x = root(|x| x * x * x - 2.0, 0.0, 2.0).unwrap();
        assert!((x - 2.0_f64.cbrt()).abs() < 1e-15);
    }

    #[test]
    fn root_at_an_end_and_no_root() {
        assert_eq!(root(|x| x, 0.0, 1.0), Some(0.0));
        assert_eq!(root(|x| x * x + 1.0, -1.0, 1.0), None);
        assert_eq!(root(|_| f64::NAN, -1.0, 1.0), None);
    }

    #[test]
    fn root_of_a_steep_function() {
        let x = root(|x: f64| x.signum() * x.abs().powf(0.3) + 1e-3, -1.0, 2.0).unwrap();
        assert!((x + 1e-10).abs() < 1e-20);
    }

    #[test]
    fn maximum_of_a_parabola() {
        let (x, value) = maximise(|x| 1.0 - (x - 0.3) * (x - 0.3), -1.0, 1.0);
        assert!((x - 0.3).abs() < 1e-7);
        assert!((value - 1.0).abs() < 1e-14);
    }
}
