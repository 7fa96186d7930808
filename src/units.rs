//! Units: the only place that converts between what people write and the inside (N, mm, N mm, MPa, rad).
//!
//! | quantity | metric | US | inside |
//! |---|---|---|---|
//! | length | mm | in | mm |
//! | force | kN | kip | N |
//! | moment | kN m | kip in | N mm |
//! | stress | MPa | ksi | MPa = N/mm^2 |
//! | angle | degree | degree | rad |
//!
//! Exact factors: 1 in = 25.4 mm (international inch), 1 lbf = 4.4482216152605 N (0.45359237 kg at
//! 9.80665 m/s^2). Source: NIST Special Publication 811 (2008), appendix B.

/// Millimetres in an inch.
pub const MM_PER_INCH: f64 = 25.4;
/// Newtons in a pound-force.
pub const N_PER_LBF: f64 = 4.448_221_615_260_5;
/// Newtons in a kip.
pub const N_PER_KIP: f64 = 1000.0 * N_PER_LBF;
/// Megapascals in a ksi.
pub const MPA_PER_KSI: f64 = N_PER_KIP / (MM_PER_INCH * MM_PER_INCH);

/// The dimension of a quantity.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Dimension {
    /// A pure number.
    Pure,
    /// Length.
    Length,
    /// Force.
    Force,
    /// Moment.
    Moment,
    /// Stress.
    Stress,
    /// Angle.
    Angle,
    /// Force per length of weld.
    LineForce,
}

/// The two systems of units a joint file may be written in.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum UnitSystem {
    /// mm, kN, kN m, MPa.
    Metric,
    /// in, kip, kip in, ksi.
    Us,
}

impl UnitSystem {
    /// The unit's symbol for a dimension.
    #[must_use]
    pub fn symbol(self, dimension: Dimension) -> &'static str {
        match (self, dimension) {
            (_, Dimension::Pure) => "",
            (_, Dimension::Angle) => "deg",
            (Self::Metric, Dimension::Length) => "mm",
            (Self::Metric, Dimension::Force) => "kN",
            (Self::Metric, Dimension::Moment) => "kN m",
            (Self::Metric, Dimension::Stress) => "MPa",
            (Self::Metric, Dimension::LineForce) => "kN/mm",
            (Self::Us, Dimension::Length) => "in",
            (Self::Us, Dimension::Force) => "kip",
            (Self::Us, Dimension::Moment) => "kip in",
            (Self::Us, Dimension::Stress) => "ksi",
            (Self::Us, Dimension::LineForce) => "kip/in",
        }
    }

    /// How many inside units (mm, N, N mm, MPa, rad, N/mm) one unit of this system holds.
    #[must_use]
    pub fn factor(self, dimension: Dimension) -> f64 {
        match (self, dimension) {
            (_, Dimension::Pure) | (Self::Metric, Dimension::Length | Dimension::Stress) => 1.0,
            (_, Dimension::Angle) => std::f64::consts::PI / 180.0,
            (Self::Metric, Dimension::Force | Dimension::LineForce) => 1e3,
            (Self::Metric, Dimension::Moment) => 1e6,
            (Self::Us, Dimension::Length) => MM_PER_INCH,
            (Self::Us, Dimension::Force) => N_PER_KIP,
            (Self::Us, Dimension::Moment) => N_PER_KIP * MM_PER_INCH,
            (Self::Us, Dimension::Stress) => MPA_PER_KSI,
            (Self::Us, Dimension::LineForce) => N_PER_KIP / MM_PER_INCH,
        }
    }

    /// From this system's unit to the inside unit.
    #[must_use]
    pub fn inside(self, dimension: Dimension, value: f64) -> f64 {
        value * self.factor(dimension)
    }

    /// From the inside unit to this system's unit.
    #[must_use]
    pub fn shown(self, dimension: Dimension, value: f64) -> f64 {
        value / self.factor(dimension)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn published_factors() {
        // NIST SP 811 (2008) appendix B.8: 1 ksi = 6.894757 MPa, 1 kip = 4.448222 kN, 1 lbf in = 0.1129848 N m.
        assert!((UnitSystem::Us.factor(Dimension::Stress) - 6.894_757).abs() < 5e-7);
        assert!((UnitSystem::Us.factor(Dimension::Force) - 4_448.222).abs() < 5e-4);
        assert!((UnitSystem::Us.factor(Dimension::Moment) - 112_984.8).abs() < 0.05);
    }

    #[test]
    fn there_and_back() {
        for system in [UnitSystem::Metric, UnitSystem::Us] {
            for dimension in [Dimension::Length, Dimension::Force, Dimension::Moment, Dimension::Angle] {
                let value = system.shown(dimension, system.inside(dimension, 3.7));
                assert!((value - 3.7).abs() < 1e-14);
            }
        }
    }
}
