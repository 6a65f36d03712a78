//! Kinds of pump and the limits typical of them.

use crate::source::Read;
use crate::words::words;
use serde::Deserialize;
use std::sync::LazyLock;

words! {
    /// How the pump moves oil.
    PumpKind: "pump kind" {
        ExternalGear = "external-gear",
        InternalGear = "internal-gear",
        Vane = "vane",
        AxialPiston = "axial-piston",
        BentAxis = "bent-axis",
        RadialPiston = "radial-piston",
        Gerotor = "gerotor",
    }
}

words! {
    /// What the oil does with all levers in neutral.
    Neutral: "neutral" {
        OpenCentre = "open-centre",
        LoadSensing = "load-sensing",
        ClosedLoop = "closed-loop",
    }
}

/// A typical figure and the spread met in the trade.
#[derive(Debug, Clone, Copy, PartialEq, Deserialize)]
#[serde(from = "[f64; 3]")]
pub struct Typical {
    /// The figure used where none is given.
    pub typical: f64,
    /// Least met.
    pub from: f64,
    /// Greatest met.
    pub to: f64,
}

impl From<[f64; 3]> for Typical {
    fn from([typical, from, to]: [f64; 3]) -> Self {
        Self { typical, from, to }
    }
}

/// Limits typical of a kind: viscosities in mm²/s, inlet pressures in kPa absolute.
#[derive(Debug, Clone, PartialEq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct KindLimits {
    id: String,
    /// Thickest oil at a start.
    pub viscosity_start_max: Typical,
    /// Thickest oil at work.
    pub viscosity_work_max: Typical,
    /// Thinnest oil for long.
    pub viscosity_min: Typical,
    /// Thinnest oil for a short time.
    pub viscosity_min_short: Typical,
    /// Lowest inlet pressure at a start.
    pub inlet_pressure_start_min: Typical,
    /// Lowest inlet pressure at work.
    pub inlet_pressure_work_min: Typical,
    /// Where the row comes from.
    pub source: String,
    /// How it was read.
    pub read: Read,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Table {
    kind: Vec<KindLimits>,
}

static TABLE: LazyLock<Vec<KindLimits>> = LazyLock::new(|| {
    toml::from_str::<Table>(include_str!("kinds.toml")).map(|table| table.kind).unwrap_or_default()
});

impl PumpKind {
    /// The limits typical of the kind; `None` only if the embedded table lacked it, which a test
    /// rules out.
    #[must_use]
    pub fn limits(self) -> Option<&'static KindLimits> {
        TABLE.iter().find(|row| row.id == self.id())
    }
}
