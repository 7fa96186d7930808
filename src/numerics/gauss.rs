//! Gauss-Legendre quadrature: `integral of f over [-1, 1] = sum w_i f(x_i)`, exact to degree 2n - 1.
//!
//! | symbol | code | meaning |
//! |---|---|---|
//! | n | `points` | number of nodes |
//! | x_i | `nodes` | roots of the Legendre polynomial P_n |
//! | w_i | `weights` | `2 / ((1 - x_i^2) P_n'(x_i)^2)` |
//!
//! The roots are found by Newton's method on the three-term recurrence, from `cos(pi (i - 1/4) / (n + 1/2))`.
//! Source: Abramowitz and Stegun, Handbook of Mathematical Functions (1964), 22.7.10, 22.16.6 and 25.4.29.
//! Valid for n from 1 to a few hundred. Grading toward singularities is left to the caller.

/// A Gauss-Legendre rule on [-1, 1].
#[derive(Debug, Clone, PartialEq)]
pub struct GaussLegendre {
    nodes: Vec<f64>,
    weights: Vec<f64>,
}

impl GaussLegendre {
    /// The rule of `points` nodes (at least one).
    #[must_use]
    pub fn new(points: u16) -> Self {
        let count = points.max(1);
        let n = f64::from(count);
        let mut nodes = Vec::with_capacity(usize::from(count));
        let mut weights = Vec::with_capacity(usize::from(count));
        for i in 1..=count {
            let mut x = -(std::f64::consts::PI * (f64::from(i) - 0.25) / (n + 0.5)).cos();
            let mut slope = 1.0;
            for _ in 0..100 {
                let (value, derivative) = legendre(count, x);
                slope = derivative;
                let step = value / derivative;
                x -= step;
                if step.abs() < 1e-16 {
                    break;
                }
            }
            nodes.push(x);
            weights.push(2.0 / ((1.0 - x * x) * slope * slope));
        }
        Self { nodes, weights }
    }

    /// Node and weight pairs, by increasing node.
    pub fn iter(&self) -> impl Iterator<Item = (f64, f64)> + '_ {
        self.nodes.iter().copied().zip(self.weights.iter().copied())
    }

    /// Number of nodes.
    #[must_use]
    pub fn points(&self) -> usize {
        self.nodes.len()
    }
}

/// `P_n(x)` and its derivative.
fn legendre(n: u16, x: f64) -> (f64, f64) {
    let (mut before, mut value) = (1.0, x);
    for k in 2..=n {
        let k = f64::from(k);
        (before, value) = (value, ((2.0 * k - 1.0) * x * value - (k - 1.0) * before) / k);
    }
    let derivative = f64::from(n) * (x * value - before) / (x * x - 1.0);
    (value, derivative)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn published_five_point_rule() {
        // Abramowitz and Stegun, table 25.4, n = 5.
        let rule = GaussLegendre::new(5);
        let pairs: Vec<_> = rule.iter().collect();
        assert!((pairs[4].0 - 0.906_179_845_938_664).abs() < 1e-15);
        assert!((pairs[4].1 - 0.236_926_885_056_189).abs() < 1e-15);
        assert!(pairs[2].0.abs() < 1e-15);
        assert!((pairs[2].1 - 0.568_888_888_888_889).abs() < 1e-15);
    }

    #[test]
    fn exact_to_twice_the_points_less_one() {
        for points in 1..=20_u16 {
            let rule = GaussLegendre::new(points);
            assert_eq!(rule.points(), usize::from(points));
            for degree in 0..i32::from(2 * points) {
                let sum: f64 = rule.iter().map(|(x, w)| w * x.powi(degree)).sum();
                let exact = if degree % 2 == 0 { 2.0 / (f64::from(degree) + 1.0) } else { 0.0 };
                assert!((sum - exact).abs() < 1e-13, "n {points}, degree {degree}: {sum} against {exact}");
            }
        }
    }
}
