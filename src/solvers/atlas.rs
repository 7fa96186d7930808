//! A map of all motions of a group at first rupture to the loads they carry: where every state is looked for.
//!
//! The direction of a motion `q = (v_x, v_y, omega rho)` is a point of the unit sphere with the azimuth
//! `alpha` of its translation and the latitude `beta = atan(omega rho / |v|)`. The wrench at rupture W(q) is a
//! continuous map of that sphere onto the sphere of load directions, of degree one and odd (`W(-q) = -W(q)`),
//! so half of it is stored. Where it folds, a load has three or more states.
//!
//! Folds lie close to pure translations (the rupturing end changes as omega changes sign, and theta is small
//! on whole runs), so the grid is graded in latitude toward `beta = 0` and in azimuth toward the directions of
//! the runs; rotations about the centre of an arc, where theta is zero all along it, are ringed by samples of
//! their own. A cell is suspect when the map turns over in it: the Jacobian
//! `det [K, -W/|W|; (dg/dq)^T, 0]` has different signs at its corners or next to a change of the rupturing point
//! along an edge, or a triangle of images is turned the other way. Suspect cells are quartered repeatedly.
//!
//! A load is looked up in every triangle of images, with a margin; each hit gives a start for Newton's method.
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | alpha | `azimuth` | rad | direction of the translation |
//! | beta | `latitude` | rad | share of rotation in the motion |
//! | W | `image` | - | unit wrench at rupture |
//!
//! A map of degree one covers every load once more with its orientation kept than turned over, so the signs of
//! all states sum to one: a search that ends otherwise has missed some, and is repeated from a wider net.
//! Beyond that, completeness is a matter of resolution: held against dense meshes in the tests, not proven.

use super::equilibrium::orientation;
use crate::mechanics::{PlaneGroup, Quadrature, Shape, Triple};
use nalgebra::{Matrix3, Vector2};
use std::f64::consts::{PI, TAU};

/// How finely the sphere of motions is sampled.
#[derive(Debug, Clone, PartialEq)]
pub struct AtlasSettings {
    /// Widest cell in azimuth, degrees. The largest folds span tens of degrees; 4 catches all beyond 1e-5.
    pub widest_azimuth: f64,
    /// Distances from the direction of a run at which azimuths are added, degrees: the rupture limit is capped
    /// up to 11.4 degrees, and the deformation at peak strength varies fastest below 3.
    pub around_runs: Vec<f64>,
    /// Distances from a rotation about the centre of an arc at which it is ringed by samples, degrees.
    pub around_arcs: Vec<f64>,
    /// Latitudes, degrees, from 0 to 90.
    pub latitudes: Vec<f64>,
    /// How often a suspect cell is quartered.
    pub depth: u8,
    /// How far outside a triangle of images a load may lie, in barycentric coordinates, to count as a hit:
    /// allows for the curvature of the map within a cell.
    pub margin: f64,
    /// Directions of runs beyond this number are not graded toward (large groups have no preferred direction).
    pub graded_runs: usize,
}

impl Default for AtlasSettings {
    fn default() -> Self {
        Self {
            widest_azimuth: 4.0,
            around_runs: vec![0.0, 1.5, 3.0, 6.0, 11.4],
            around_arcs: vec![0.0, 0.2, 0.6, 1.5, 4.0, 9.0],
            latitudes: vec![
                0.0, 0.03, 0.3, 0.7, 1.3, 2.0, 3.0, 4.5, 6.5, 9.0, 12.0, 16.0, 21.0, 27.0, 34.0, 42.0, 51.0,
                61.0, 72.0, 81.0, 90.0,
            ],
            depth: 3,
            margin: 0.3,
            graded_runs: 8,
        }
    }
}

/// One sampled motion.
#[derive(Debug, Clone, Copy)]
struct Sample {
    motion: Triple,
    image: Triple,
    /// Whether the map keeps orientation here; `None` for a pure translation, where the Jacobian jumps.
    keeps: Option<bool>,
    /// What ruptures: piece and place.
    branch: (usize, Vector2<f64>),
}

/// A triangle of motions and their images.
#[derive(Debug, Clone, Copy)]
struct Patch {
    motions: [Triple; 3],
    images: [Triple; 3],
    middle: Triple,
    /// Cosine of the angle around `middle` within which a load may be a hit.
    nearness: f64,
    suspect: bool,
}

/// The sampled map of a group.
#[derive(Debug, Clone)]
pub struct Atlas {
    patches: Vec<Patch>,
    margin: f64,
}

impl Atlas {
    /// Samples the map of a group.
    #[must_use]
    pub fn new(group: &PlaneGroup, settings: &AtlasSettings) -> Self {
        let surveyor = Surveyor { group, quadrature: Quadrature::coarse(), settings };
        surveyor.survey()
    }

    /// Motions from which Newton's method is to start for the unit load `direction`, in a fixed order.
    #[must_use]
    pub fn starts(&self, direction: &Triple) -> Vec<Triple> {
        let mut starts = Vec::new();
        for patch in &self.patches {
            let cosine = patch.middle.dot(direction);
            if cosine.abs() >= patch.nearness {
                let sign = cosine.signum();
                patch.hits(&(direction * sign), self.margin, |start| starts.push(start * sign));
            }
        }
        starts
    }

    /// Every corner and middle of every triangle near the load: a wider net, for when the states found cannot
    /// be all.
    #[must_use]
    pub fn wide_starts(&self, direction: &Triple) -> Vec<Triple> {
        let mut starts = Vec::new();
        for patch in &self.patches {
            let cosine = patch.middle.dot(direction);
            if cosine.abs() >= patch.nearness {
                let sum = patch.motions[0] + patch.motions[1] + patch.motions[2];
                starts.push(sum.normalize() * cosine.signum());
                starts.extend(
                    patch.motions.iter().map(|motion| (motion * 3.0 + sum).normalize() * cosine.signum()),
                );
            }
        }
        starts
    }

    /// The sampled motion whose load lies nearest to `direction`.
    #[must_use]
    pub fn nearest(&self, direction: &Triple) -> Triple {
        let mut best = (f64::NEG_INFINITY, Triple::zeros());
        for patch in &self.patches {
            for (motion, image) in patch.motions.iter().zip(&patch.images) {
                let cosine = image.dot(direction);
                if cosine.abs() > best.0 {
                    best = (cosine.abs(), motion * cosine.signum());
                }
            }
        }
        best.1
    }
}

impl Patch {
    fn new(corners: [&Sample; 3], suspect: bool) -> Self {
        let motions = corners.map(|corner| corner.motion);
        let images = corners.map(|corner| corner.image);
        let middle = (images[0] + images[1] + images[2]).normalize();
        let radius = images.iter().map(|image| (image - middle).norm()).fold(0.0, f64::max);
        // Chord to cosine, with room for the margin.
        let reach = (2.0 * radius + 1e-3).min(2.0);
        Self { motions, images, middle, nearness: (1.0 - 0.5 * reach * reach).max(0.0), suspect }
    }

    /// Calls `found` with a start for every way in which the load may lie in this patch.
    fn hits(&self, direction: &Triple, margin: f64, mut found: impl FnMut(Triple)) {
        let matrix = Matrix3::from_columns(&self.images);
        let inside = matrix.try_inverse().map(|inverse| inverse * direction).filter(|shares| {
            let sum = shares.sum();
            sum > 0.0 && shares.iter().all(|share| *share >= -margin * sum)
        });
        if let Some(shares) = inside {
            let start = self.motions[0] * shares.x + self.motions[1] * shares.y + self.motions[2] * shares.z;
            found(start.normalize());
        }
        if self.suspect {
            found((self.motions[0] + self.motions[1] + self.motions[2]).normalize());
        }
    }
}

/// Coordinates of a grid to a unit motion.
type Chart<'a> = dyn Fn(f64, f64) -> Triple + 'a;

struct Surveyor<'a> {
    group: &'a PlaneGroup,
    quadrature: Quadrature,
    settings: &'a AtlasSettings,
}

impl Surveyor<'_> {
    fn survey(&self) -> Atlas {
        let mut atlas = Atlas { patches: Vec::new(), margin: self.settings.margin };
        let latitudes: Vec<f64> =
            self.settings.latitudes.iter().map(|degrees| degrees.to_radians()).collect();
        let globe = |azimuth: f64, latitude: f64| {
            let (sine, cosine) = latitude.sin_cos();
            Triple::new(cosine * azimuth.cos(), cosine * azimuth.sin(), sine)
        };
        self.chart(&mut atlas, &globe, &self.azimuths(), &latitudes);
        let radii: Vec<f64> = self.settings.around_arcs.iter().map(|degrees| degrees.to_radians()).collect();
        let turn: Vec<f64> = (0..=FAN).map(|part| TAU * f64::from(part) / f64::from(FAN)).collect();
        for about in self.arc_centres() {
            let first = about.cross(&Triple::x()).normalize();
            let second = about.cross(&first);
            let fan = |angle: f64, radius: f64| {
                (about + (first * angle.cos() + second * angle.sin()) * radius.tan()).normalize()
            };
            self.chart(&mut atlas, &fan, &turn, &radii);
        }
        atlas
    }

    /// Charts every cell of a grid of the sphere; the last column closes on the first.
    fn chart(&self, atlas: &mut Atlas, chart: &Chart, columns: &[f64], rows: &[f64]) {
        let column =
            |x: f64| -> Vec<Option<Sample>> { rows.iter().map(|y| self.sample(&chart(x, *y))).collect() };
        let first = column(columns[0]);
        let mut left = first.clone();
        for (index, pair) in columns.windows(2).enumerate() {
            let last = index + 2 == columns.len();
            let right = if last { first.clone() } else { column(pair[1]) };
            for row in 0..rows.len() - 1 {
                if let (Some(a), Some(b), Some(c), Some(d)) =
                    (left[row], right[row], right[row + 1], left[row + 1])
                {
                    let cell = [(pair[0], rows[row]), (pair[1], rows[row + 1])];
                    self.cell(atlas, chart, cell, [a, b, c, d], self.settings.depth);
                }
            }
            left = right;
        }
    }

    /// Rotations about the centres of the arcs: theta is zero along the whole arc, so the map has a cone there.
    fn arc_centres(&self) -> Vec<Triple> {
        let mut motions: Vec<Triple> = Vec::new();
        for piece in &self.group.pieces {
            if let Shape::Arc { centre, .. } = piece.shape {
                let motion = Triple::new(centre.y, -centre.x, 1.0).normalize();
                if motions.len() < self.settings.graded_runs
                    && motions.iter().all(|known| (known - motion).norm() > 1e-6)
                {
                    motions.push(motion);
                }
            }
        }
        motions
    }

    /// Azimuths from 0 to a full turn: graded toward the directions of the straight runs, no gap too wide.
    fn azimuths(&self) -> Vec<f64> {
        let mut directions: Vec<f64> = Vec::new();
        for piece in &self.group.pieces {
            if let Shape::Straight { tangent, .. } = piece.shape {
                let angle = tangent.y.atan2(tangent.x).rem_euclid(PI);
                if directions.iter().all(|known| (known - angle).abs() > 1e-6) {
                    directions.push(angle);
                }
            }
        }
        let mut azimuths = vec![0.0, TAU];
        if directions.len() <= self.settings.graded_runs {
            for direction in directions {
                for degrees in &self.settings.around_runs {
                    for sign in [-1.0, 1.0] {
                        let azimuth = (direction + sign * degrees.to_radians()).rem_euclid(PI);
                        azimuths.extend([azimuth, azimuth + PI]);
                    }
                }
            }
        }
        azimuths.sort_by(f64::total_cmp);
        azimuths.dedup_by(|a, b| (*a - *b).abs() < CLOSEST_AZIMUTHS);
        if azimuths[azimuths.len() - 1] < TAU {
            azimuths.push(TAU);
        }
        let widest = self.settings.widest_azimuth.to_radians();
        let mut filled = vec![azimuths[0]];
        for pair in azimuths.windows(2) {
            let parts = ((pair[1] - pair[0]) / widest).ceil().max(1.0);
            let mut part = 1.0;
            while part <= parts {
                filled.push(pair[0] + (pair[1] - pair[0]) * part / parts);
                part += 1.0;
            }
        }
        filled
    }

    fn sample(&self, motion: &Triple) -> Option<Sample> {
        let utmost = self.group.utmost(motion)?;
        let resultant = self.group.resultant(&(motion / utmost.ratio), &self.quadrature);
        let image = resultant.wrench.normalize();
        let keeps = (motion.z.abs() > 1e-12).then(|| orientation(&resultant, &utmost) >= 0.0);
        image.norm().is_finite().then_some(Sample {
            motion: *motion,
            image,
            keeps,
            branch: (utmost.piece, utmost.at),
        })
    }

    /// Adds a cell, given by two opposite corners and the samples at (lower left, lower right, upper right,
    /// upper left).
    fn cell(&self, atlas: &mut Atlas, chart: &Chart, cell: [(f64, f64); 2], corners: [Sample; 4], depth: u8) {
        let [a, b, c, d] = &corners;
        let suspect = self.suspect(&corners);
        if suspect && depth > 0 {
            let [(west, south), (east, north)] = cell;
            let (middle, centre) = (0.5 * (west + east), 0.5 * (south + north));
            let between =
                [(middle, south), (east, centre), (middle, north), (west, centre), (middle, centre)];
            if let [Some(lower), Some(right), Some(upper), Some(left), Some(inner)] =
                between.map(|(x, y)| self.sample(&chart(x, y)))
            {
                let depth = depth - 1;
                self.cell(atlas, chart, [(west, south), (middle, centre)], [*a, lower, inner, left], depth);
                self.cell(atlas, chart, [(middle, south), (east, centre)], [lower, *b, right, inner], depth);
                self.cell(atlas, chart, [(middle, centre), (east, north)], [inner, right, *c, upper], depth);
                self.cell(atlas, chart, [(west, centre), (middle, north)], [left, inner, upper, *d], depth);
                return;
            }
        }
        // A cell at a pole is a triangle.
        let same = |one: &Sample, two: &Sample| (one.motion - two.motion).norm() < 1e-12;
        if !same(a, b) {
            atlas.patches.push(Patch::new([a, b, c], suspect));
        }
        if !same(c, d) {
            atlas.patches.push(Patch::new([a, c, d], suspect));
        }
    }

    /// Whether the map turns over within a cell: not all signs known of it agree.
    fn suspect(&self, corners: &[Sample; 4]) -> bool {
        let [a, b, c, d] = corners;
        let mut signs = corners.iter().filter_map(|corner| corner.keeps);
        let Some(keeps) = signs.next() else { return true };
        if signs.any(|other| other != keeps) {
            return true;
        }
        let triangles = [(a, b, c), (a, c, d)];
        if triangles
            .iter()
            .any(|(one, two, three)| keeps_order(one, two, three).is_some_and(|sign| sign != keeps))
        {
            return true;
        }
        [(a, b), (b, c), (c, d), (d, a)].into_iter().any(|(from, to)| self.turns_at_change(from, to, keeps))
    }

    /// Whether one point ruptures in both: the same end of a straight run, or the same arc.
    fn same_branch(&self, one: (usize, Vector2<f64>), two: (usize, Vector2<f64>)) -> bool {
        let arc = matches!(self.group.pieces[one.0].shape, Shape::Arc { .. });
        one.0 == two.0 && (arc || (one.1 - two.1).norm() < 1e-6)
    }

    /// Whether the Jacobian has the other sign next to a change of the rupturing point between two samples.
    fn turns_at_change(&self, from: &Sample, to: &Sample, keeps: bool) -> bool {
        if self.same_branch(from.branch, to.branch) {
            return false;
        }
        let (mut near, mut far) = (from.motion, to.motion);
        for _ in 0..12 {
            let middle = (near + far).normalize();
            match self.group.utmost(&middle) {
                Some(utmost) if self.same_branch((utmost.piece, utmost.at), from.branch) => near = middle,
                Some(_) => far = middle,
                None => return false,
            }
        }
        [near, far]
            .iter()
            .any(|motion| self.sample(motion).is_some_and(|sample| sample.keeps == Some(!keeps)))
    }
}

/// Samples on a ring around a rotation about the centre of an arc.
const FAN: u8 = 24;
/// Azimuths closer than this are merged, rad.
const CLOSEST_AZIMUTHS: f64 = 0.005;

/// Whether the images of three samples keep the order of their motions; `None` for a degenerate triangle.
fn keeps_order(a: &Sample, b: &Sample, c: &Sample) -> Option<bool> {
    let volume = |one: &Triple, two: &Triple, three: &Triple| one.dot(&two.cross(three));
    let before = volume(&a.motion, &b.motion, &c.motion);
    let after = volume(&a.image, &b.image, &c.image);
    (before.abs() > 1e-14).then_some((before > 0.0) == (after > 0.0))
}
