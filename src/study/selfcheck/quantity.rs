//! What is printed: the closed sets of the published cases, with their names in the data.
//!
//! | quantity | symbol | unit | meaning |
//! |---|---|---|---|
//! | `C` | C | kip/in per 1/16 in of leg | R_n / (D l): nominal strength, leg in sixteenths of an inch, length l |
//! | `0.75 C` | phi C | the same | the same for the design strength, phi = 0.75 |
//! | `i_x`, `i_y`, `j` | I_x, I_y, I_p | in^4/in | second moments of the welds as lines, per unit of throat |
//! | `line-force` | r | 1/in | greatest elastic force per length under a unit load |
//! | `load-lrfd`, `load-asd` | P_u, P_a | kip | design load by the elastic method |
//! | `throat` | t | mm | throat required by the elastic method at a permissible stress |
//!
//! Units are those of the sources; the reader refuses a row that states another.

use serde::Deserialize;

/// The method a printed value comes from.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "kebab-case")]
pub enum Method {
    /// Instantaneous-centre method.
    InstantaneousCentre,
    /// Rule for loads through the centroid.
    Concentric,
    /// Elastic vector method, welds as lines.
    Elastic,
}

impl Method {
    /// Its name in the data.
    #[must_use]
    pub fn name(self) -> &'static str {
        match self {
            Self::InstantaneousCentre => "instantaneous-centre",
            Self::Concentric => "concentric",
            Self::Elastic => "elastic",
        }
    }
}

/// What a printed value is.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Deserialize)]
pub enum Quantity {
    /// Strength coefficient.
    #[serde(rename = "C")]
    Coefficient,
    /// Strength coefficient times the resistance factor.
    #[serde(rename = "0.75 C")]
    DesignCoefficient,
    /// Second moment about the horizontal axis.
    #[serde(rename = "i_x")]
    InertiaX,
    /// Second moment about the vertical axis.
    #[serde(rename = "i_y")]
    InertiaY,
    /// Polar second moment.
    #[serde(rename = "j")]
    InertiaPolar,
    /// Greatest force per length under a unit load.
    #[serde(rename = "line-force")]
    LineForce,
    /// Design load, load and resistance factors.
    #[serde(rename = "load-lrfd")]
    LoadLrfd,
    /// Design load, allowable strength.
    #[serde(rename = "load-asd")]
    LoadAsd,
    /// Throat required.
    #[serde(rename = "throat")]
    Throat,
}

impl Quantity {
    /// Its name in the data.
    #[must_use]
    pub fn name(self) -> &'static str {
        match self {
            Self::Coefficient => "C",
            Self::DesignCoefficient => "0.75 C",
            Self::InertiaX => "i_x",
            Self::InertiaY => "i_y",
            Self::InertiaPolar => "j",
            Self::LineForce => "line-force",
            Self::LoadLrfd => "load-lrfd",
            Self::LoadAsd => "load-asd",
            Self::Throat => "throat",
        }
    }

    /// Its unit in the data.
    #[must_use]
    pub fn unit(self) -> &'static str {
        match self {
            Self::Coefficient | Self::DesignCoefficient => "kip/in per 1/16 in of leg",
            Self::InertiaX | Self::InertiaY | Self::InertiaPolar => "in^4/in",
            Self::LineForce => "1/in",
            Self::LoadLrfd | Self::LoadAsd => "kip",
            Self::Throat => "mm",
        }
    }

    /// The method it belongs to; the coefficients are printed for two.
    #[must_use]
    pub fn belongs_to(self, method: Method) -> bool {
        match self {
            Self::Coefficient | Self::DesignCoefficient => method != Method::Elastic,
            Self::InertiaX
            | Self::InertiaY
            | Self::InertiaPolar
            | Self::LineForce
            | Self::LoadLrfd
            | Self::LoadAsd
            | Self::Throat => method == Method::Elastic,
        }
    }
}

/// How a value was taken from its source.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "kebab-case")]
pub enum Reading {
    /// As printed.
    Printed,
    /// As printed; columns of a scanned text decoded.
    Scanned,
    /// The source itself interpolated a table.
    Interpolated,
}
