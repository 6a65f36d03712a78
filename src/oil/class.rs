//! Built-in oil classes: what a class promises where there is no data sheet.
//!
//! Left out as doubtful or unusable: the specification for rust-inhibited PAO fluid (its recalled
//! limits are opposite edges and no line can go through them), the preservative fluid (40 and
//! 100 °C limits not recalled), instrument fluids of GOST 15819, winter classes known by name only,
//! and contract texts with a single cold limit.

use super::band::{Base, ColdLimit};
use crate::source::Read;
use serde::Deserialize;
use std::sync::LazyLock;

/// One class.
#[derive(Debug, Clone, PartialEq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Class {
    id: String,
    base: Base,
    /// (°C, mm²/s).
    points: Vec<[f64; 2]>,
    index: Option<f64>,
    pour: f64,
    /// (°C, mm²/s).
    cold_limit: Option<[f64; 2]>,
    flash: f64,
    density: f64,
    biodegradable: bool,
    #[serde(default)]
    reference_only: bool,
    source: String,
    read: Read,
    note: String,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Table {
    class: Vec<Class>,
}

/// Empty only if the embedded table were damaged, which a test rules out.
static CLASSES: LazyLock<Vec<Class>> = LazyLock::new(|| {
    toml::from_str::<Table>(include_str!("classes.toml"))
        .map(|table| table.class)
        .unwrap_or_default()
});

impl Class {
    /// All classes, in the order in which they are shown.
    #[must_use]
    pub fn all() -> &'static [Self] {
        &CLASSES
    }

    /// The class of a name: `HM 46`, `hm-46` and `HM46` are one.
    #[must_use]
    pub fn named(name: &str) -> Option<&'static Self> {
        let fold = |text: &str| -> String {
            text.chars().filter(|c| c.is_alphanumeric()).flat_map(char::to_uppercase).collect()
        };
        let wanted = fold(name);
        Self::all().iter().find(|class| fold(&class.id) == wanted)
    }

    /// The name, `HM-46`.
    #[must_use]
    pub fn id(&self) -> &str {
        &self.id
    }

    /// What it is made from.
    #[must_use]
    pub const fn base(&self) -> Base {
        self.base
    }

    /// Limit points, (°C, mm²/s).
    #[must_use]
    pub fn points(&self) -> &[[f64; 2]] {
        &self.points
    }

    /// Least viscosity index.
    #[must_use]
    pub const fn index(&self) -> Option<f64> {
        self.index
    }

    /// Warmest pour point, °C.
    #[must_use]
    pub const fn pour_c(&self) -> f64 {
        self.pour
    }

    /// Published greatest viscosity in the cold.
    #[must_use]
    pub fn cold_limit(&self) -> Option<ColdLimit> {
        self.cold_limit.map(|[at_c, viscosity]| ColdLimit { at_c, viscosity })
    }

    /// Least flash point, °C.
    #[must_use]
    pub const fn flash_c(&self) -> f64 {
        self.flash
    }

    /// Typical density at 15 °C, kg/m³.
    #[must_use]
    pub const fn density_15(&self) -> f64 {
        self.density
    }

    /// Biodegradable by its class; the degree by certificate.
    #[must_use]
    pub const fn biodegradable(&self) -> bool {
        self.biodegradable
    }

    /// Only for comparison.
    #[must_use]
    pub const fn reference_only(&self) -> bool {
        self.reference_only
    }

    /// Where the row comes from.
    #[must_use]
    pub fn source(&self) -> &str {
        &self.source
    }

    /// How the source was read.
    #[must_use]
    pub const fn read(&self) -> Read {
        self.read
    }

    /// What a user of the row should know.
    #[must_use]
    pub fn note(&self) -> &str {
        &self.note
    }
}

/// Typical flash point, °C, of a base and a viscosity at 40 °C in mm²/s: that of the thickest class
/// of the base whose grade starts at or under it; `None` where there is none.
#[must_use]
pub fn typical_flash(base: Base, kv40: f64) -> Option<f64> {
    Class::all()
        .iter()
        .filter(|class| class.base == base && !class.reference_only)
        .filter_map(|class| Some((class.points.first()?[1], class.flash)))
        .filter(|(middle, _)| 0.9 * middle <= kv40)
        .max_by(|a, b| a.0.total_cmp(&b.0))
        .map(|(_, flash)| flash)
}
