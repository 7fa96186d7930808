//! Roots and maxima of functions of one variable on a bracket.
//!
//! `root` is regula falsi in the Illinois variant with bisection as a safeguard; `maximise` steps to the top of
//! a parabola, with golden sections as a safeguard. Both need only values, and both end after a fixed number of
//! steps whatever the function does.
//! Source: Dahlquist and Bjorck, Numerical Methods (1974), 6.4 (Illinois); R. P. Brent, Algorithms for
//! Minimization without Derivatives (1973), chapter 5.

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
///
/// The place is found to about 1e-8 of the bracket, the value to rounding where `f` is smooth.
#[allow(clippy::float_cmp)] // the very same place, not one nearby
pub fn maximise(mut f: impl FnMut(f64) -> f64, a: f64, b: f64) -> (f64, f64) {
    let golden = 0.5 * (3.0 - 5.0_f64.sqrt());
    let (mut low, mut high) = (a.min(b), a.max(b));
    let tolerance = 1e-8 * (high - low);
    let mut best = low + golden * (high - low);
    let mut f_best = f(best);
    // Second and third best places: with the best they carry the parabola.
    let (mut second, mut f_second, mut third, mut f_third) = (best, f_best, best, f_best);
    let (mut step, mut step_before) = (0.0_f64, 0.0_f64);
    for _ in 0..STEPS {
        let middle = 0.5 * (low + high);
        if (best - middle).abs() <= 2.0 * tolerance - 0.5 * (high - low) {
            break;
        }
        let r = (best - second) * (f_best - f_third);
        let q = (best - third) * (f_best - f_second);
        let (numerator, denominator) = ((best - third) * q - (best - second) * r, 2.0 * (q - r));
        let parabola = -numerator / denominator;
        let usable = parabola.is_finite()
            && parabola.abs() < 0.5 * step_before.abs()
            && best + parabola > low
            && best + parabola < high;
        step_before = step;
        step = if usable {
            parabola
        } else {
            step_before = if best < middle { high - best } else { low - best };
            golden * step_before
        };
        if step.abs() < tolerance {
            step = tolerance.copysign(step);
        }
        let place = best + step;
        let value = f(place);
        if value >= f_best {
            if place >= best {
                low = best
            } else {
                high = best
            }
            (third, f_third) = (second, f_second);
            (second, f_second) = (best, f_best);
            (best, f_best) = (place, value);
        } else {
            if place < best {
                low = place
            } else {
                high = place
            }
            if value >= f_second || second == best {
                (third, f_third) = (second, f_second);
                (second, f_second) = (place, value);
            } else if value >= f_third || third == best || third == second {
                (third, f_third) = (place, value);
            }
        }
    }
    (best, f_best)
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
    fn maximum_with_a_kink_and_at_an_end() {
        let (x, _) = maximise(|x: f64| -(x - 0.123_456).abs(), -1.0, 1.0);
        assert!((x - 0.123_456).abs() < 1e-7);
        let (x, _) = maximise(|x| x, 0.0, 1.0);
        assert!((x - 1.0).abs() < 1e-7);
        let (x, _) = maximise(|x| (5.0 * x).sin(), 0.0, 0.6);
        assert!((x - std::f64::consts::PI / 10.0).abs() < 1e-7);
    }

    #[test]
    fn maximum_of_a_parabola() {
        let (x, value) = maximise(|x| 1.0 - (x - 0.3) * (x - 0.3), -1.0, 1.0);
        assert!((x - 0.3).abs() < 1e-7);
        assert!((value - 1.0).abs() < 1e-14);
    }
}
