//! Groups and loads for tests: short constructors and a deterministic stream of random ones.

use std::f64::consts::{FRAC_PI_2, TAU};
use weldpole::input::catalog;
use weldpole::mechanics::{PlaneGroup, Triple};
use weldpole::model::{Discretisation, Filler, FilletSize, Run, Vector, Weld, WeldGroup};

pub fn at(x: f64, y: f64) -> Vector {
    Vector::new(x, y, 0.0)
}

pub fn straight(from: [f64; 2], to: [f64; 2]) -> Run {
    Run::straight(at(from[0], from[1]), at(to[0], to[1])).unwrap()
}

/// A weld of one run, equal legs, 490 MPa filler.
pub fn weld(name: &str, run: Run, leg: f64) -> Weld {
    Weld {
        name: name.into(),
        runs: vec![run],
        size: FilletSize::from_legs([leg, leg], FRAC_PI_2).unwrap(),
        filler: Filler::new(None, 490.0).unwrap(),
        sides: 1,
        plates: vec![],
        set: None,
    }
}

pub fn group(runs: Vec<Run>, leg: f64) -> WeldGroup {
    let welds =
        runs.into_iter().enumerate().map(|(index, run)| weld(&format!("w{index}"), run, leg)).collect();
    WeldGroup::new(welds).unwrap()
}

pub fn plane(group: &WeldGroup) -> PlaneGroup {
    PlaneGroup::new(group, catalog::law("lesik-kennedy").unwrap(), 0.6, Discretisation::Continuous)
}

/// A deterministic stream of numbers (xorshift64*, G. Marsaglia, J. Stat. Softw. 8 (2003) 14).
pub struct Stream(u64);

impl Stream {
    pub fn new(seed: u64) -> Self {
        Self(seed.wrapping_mul(0x9E37_79B9_7F4A_7C15) | 1)
    }

    /// Between 0 and 1.
    pub fn share(&mut self) -> f64 {
        self.0 ^= self.0 << 13;
        self.0 ^= self.0 >> 7;
        self.0 ^= self.0 << 17;
        (self.0 >> 11) as f64 / (1_u64 << 53) as f64
    }

    pub fn between(&mut self, low: f64, high: f64) -> f64 {
        low + (high - low) * self.share()
    }

    pub fn below(&mut self, count: usize) -> usize {
        ((self.share() * count as f64) as usize).min(count - 1)
    }

    /// A direction uniform on the sphere.
    pub fn direction(&mut self) -> Triple {
        let (z, azimuth) = (self.between(-1.0, 1.0), self.between(0.0, TAU));
        let flat = (1.0 - z * z).sqrt();
        Triple::new(flat * azimuth.cos(), flat * azimuth.sin(), z)
    }

    /// A random group: lines, pairs, L, C, random runs, arcs with lines, boxes; half of them with mixed legs.
    pub fn group(&mut self) -> (&'static str, WeldGroup) {
        let l = self.between(30.0, 300.0);
        let b = self.between(10.0, 350.0);
        let kind = self.below(8);
        let (name, runs) = match kind {
            0 => ("line", vec![straight([0.0, 0.0], [0.0, l])]),
            1 => ("pair", vec![straight([0.0, 0.0], [0.0, l]), straight([b, 0.0], [b, l])]),
            2 => ("L", vec![straight([0.0, l], [0.0, 0.0]), straight([0.0, 0.0], [b, 0.0])]),
            3 => (
                "C",
                vec![
                    straight([b, 0.0], [0.0, 0.0]),
                    straight([0.0, 0.0], [0.0, l]),
                    straight([0.0, l], [b, l]),
                ],
            ),
            4 | 5 => {
                let count = 2 + self.below(5);
                ("random", (0..count).map(|_| self.run()).collect())
            }
            6 => {
                let centre = at(self.between(-100.0, 100.0), self.between(-100.0, 100.0));
                let arc = Run::arc(
                    centre,
                    self.between(15.0, 100.0),
                    self.between(0.0, TAU),
                    self.between(0.5, TAU),
                );
                ("arc", vec![arc.unwrap(), self.run()])
            }
            _ => (
                "box",
                vec![
                    straight([0.0, 0.0], [b, 0.0]),
                    straight([b, 0.0], [b, l]),
                    straight([b, l], [0.0, l]),
                    straight([0.0, l], [0.0, 0.0]),
                ],
            ),
        };
        let (mixed, leg) = (self.share() < 0.5, self.between(4.0, 12.0));
        let welds = runs
            .into_iter()
            .enumerate()
            .map(|(index, run)| {
                let leg = if mixed { self.between(3.0, 14.0) } else { leg };
                weld(&format!("w{index}"), run, leg)
            })
            .collect();
        (name, WeldGroup::new(welds).unwrap())
    }

    fn run(&mut self) -> Run {
        let from = [self.between(-150.0, 150.0), self.between(-150.0, 150.0)];
        let (angle, length) = (self.between(0.0, TAU), self.between(3.0, 200.0));
        straight(from, [from[0] + length * angle.cos(), from[1] + length * angle.sin()])
    }
}
