//! A dense mesh of motion directions, independent of the solver's own sampling: every triangle of images that
//! holds a load direction starts a Newton iteration.

use nalgebra::Matrix3;
use weldpole::mechanics::{PlaneGroup, Quadrature, Triple};
use weldpole::solvers::{NewtonSettings, newton};

pub struct Triangle {
    motions: [Triple; 3],
    images: [Triple; 3],
    pub turned_over: bool,
}

impl Triangle {
    /// A load direction inside the triangle of images.
    pub fn image(&self, shares: [f64; 3]) -> Triple {
        (self.images[0] * shares[0] + self.images[1] * shares[1] + self.images[2] * shares[2]).normalize()
    }
}

/// Half of the sphere as four faces of an octahedron, each with `side` subdivisions: 4 side^2 triangles.
pub fn mesh(group: &PlaneGroup, side: usize) -> Vec<Triangle> {
    let quadrature = Quadrature::fine(6);
    let corners = [Triple::x(), Triple::y(), -Triple::x(), -Triple::y()];
    let sample = |motion: Triple| {
        let utmost = group.utmost(&motion).unwrap();
        (motion, group.resultant(&(motion / utmost.ratio), &quadrature).wrench.normalize())
    };
    let mut triangles = Vec::new();
    for face in 0..4 {
        let (a, b) = (corners[face], corners[(face + 1) % 4]);
        let rows: Vec<Vec<_>> = (0..=side)
            .map(|i| {
                (0..=side - i)
                    .map(|j| {
                        let k = side - i - j;
                        sample((a * i as f64 + b * j as f64 + Triple::z() * k as f64).normalize())
                    })
                    .collect()
            })
            .collect();
        let mut add = |corners: [(Triple, Triple); 3]| {
            let motions = corners.map(|corner| corner.0);
            let images = corners.map(|corner| corner.1);
            let turned_over = Matrix3::from_columns(&motions).determinant()
                * Matrix3::from_columns(&images).determinant()
                < 0.0;
            triangles.push(Triangle { motions, images, turned_over });
        };
        for i in 0..side {
            for j in 0..side - i {
                add([rows[i][j], rows[i + 1][j], rows[i][j + 1]]);
                if i + j + 1 < side {
                    add([rows[i + 1][j], rows[i + 1][j + 1], rows[i][j + 1]]);
                }
            }
        }
    }
    triangles
}

/// All states of the unit load `direction` that the mesh leads to: unit motions and loads, N.
pub fn states(group: &PlaneGroup, mesh: &[Triangle], direction: &Triple) -> Vec<(Triple, f64)> {
    let quadrature = Quadrature::fine(6);
    let mut found: Vec<(Triple, f64)> = Vec::new();
    for triangle in mesh {
        let middle = (triangle.images[0] + triangle.images[1] + triangle.images[2]).normalize();
        let radius = triangle.images.iter().map(|image| (image - middle).norm()).fold(0.0, f64::max);
        for sign in [1.0, -1.0] {
            let target = direction * sign;
            if (middle - target).norm() > 1.5 * radius + 1e-4 {
                continue;
            }
            let Some(inverse) = Matrix3::from_columns(&triangle.images).try_inverse() else { continue };
            let shares = inverse * target;
            let sum = shares.sum();
            if sum <= 0.0 || shares.iter().any(|share| *share < -0.2 * sum) {
                continue;
            }
            let [a, b, c] = triangle.motions;
            let start = (a * shares.x + b * shares.y + c * shares.z) * sign;
            if let Some(ending) = newton(group, &start, direction, &quadrature, &NewtonSettings::default())
                && ending.converged
            {
                let motion = ending.state.q.normalize();
                if found.iter().all(|(known, _)| (known - motion).norm() > 1e-5) {
                    found.push((motion, ending.state.load));
                }
            }
        }
    }
    found
}
