//! Viscosities as data sheets print them: kinematic, dynamic, or Saybolt Universal seconds.

use super::error::QuantityError;
use super::kinds::{KinematicViscosity, Quantity, Temperature};
use super::number::{leading, shown};
use super::spelling::trim;
use super::units::DYNAMIC_VISCOSITY;

/// A dynamic viscosity, mPa·s.
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
pub struct DynamicViscosity(f64);

impl DynamicViscosity {
    /// From mPa·s; `None` if not finite or outside 0.1 to 2e7.
    #[must_use]
    pub fn mpa_s(value: f64) -> Option<Self> {
        (0.1..=2e7).contains(&value).then_some(Self(value))
    }

    /// The value in mPa·s.
    #[must_use]
    pub const fn as_mpa_s(self) -> f64 {
        self.0
    }
}

/// A Saybolt Universal efflux time, and the temperature it was read at where it was given.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SayboltTime {
    /// Seconds.
    pub seconds: f64,
    /// Temperature of the reading, if the text says it (`150 SUS at 100 °F`).
    pub at: Option<Temperature>,
}

/// A viscosity in whichever way it was given.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum ViscosityReading {
    /// Kinematic, mm²/s.
    Kinematic(KinematicViscosity),
    /// Dynamic, mPa·s: needs the density at its temperature.
    Dynamic(DynamicViscosity),
    /// Saybolt Universal seconds: needs its temperature.
    Saybolt(SayboltTime),
}

/// `true` for the names of Saybolt Universal seconds.
pub(super) fn is_saybolt(unit: &str) -> bool {
    ["SUS", "SSU", "SUV", "Saybolt", "Saybolt seconds"].iter().any(|s| s.eq_ignore_ascii_case(unit))
}

/// The unit, and the temperature behind `at` or `@`.
fn unit_and_temperature(text: &str) -> (&str, Option<&str>) {
    // ASCII letters only are changed, so places stay the same.
    let lower = text.to_ascii_lowercase();
    let word = lower.find(" at ").map(|at| (at, " at ".len()));
    match word.or_else(|| lower.find('@').map(|at| (at, 1))) {
        Some((at, long)) => (
            trim(text.get(..at).unwrap_or_default()),
            Some(trim(text.get(at + long..).unwrap_or_default())),
        ),
        None => (trim(text), None),
    }
}

impl std::str::FromStr for ViscosityReading {
    type Err = QuantityError;

    /// Reads `46 mm²/s`, `4100 mPa·s`, `150 SUS` or `150 SUS at 100 °F`.
    fn from_str(text: &str) -> Result<Self, QuantityError> {
        let Ok(number) = leading(text) else {
            return KinematicViscosity::KIND
                .read(text)
                .and_then(KinematicViscosity::of)
                .map(Self::Kinematic);
        };
        let (unit, at) = unit_and_temperature(number.rest);
        if is_saybolt(unit) {
            if !(32.0..=1e8).contains(&number.value) {
                return Err(QuantityError::Viscosity(format!(
                    "`{}` is outside the Saybolt Universal scale, which starts at 32 SUS",
                    trim(text)
                )));
            }
            let at = at.map(str::parse).transpose()?;
            return Ok(Self::Saybolt(SayboltTime { seconds: number.value, at }));
        }
        if at.is_some() {
            return Err(QuantityError::Viscosity(format!(
                "`{}` names a temperature, which only a Saybolt time needs; write for example `1600 mm²/s`",
                trim(text)
            )));
        }
        if let Some(found) = DYNAMIC_VISCOSITY.unit(unit) {
            return DynamicViscosity::mpa_s(number.value * found.factor)
                .map(Self::Dynamic)
                .ok_or_else(|| {
                    QuantityError::Viscosity(format!(
                        "dynamic viscosity must be between 0.1 and 2e7 mPa·s, but is {}",
                        trim(text)
                    ))
                });
        }
        let kind = KinematicViscosity::KIND;
        kind.read(text).and_then(KinematicViscosity::of).map(Self::Kinematic).map_err(|e| match e {
            QuantityError::UnknownUnit { unit, .. } => QuantityError::UnknownUnit {
                unit,
                noun: "viscosity",
                example: format!("{} mm²/s", shown(number.value)),
                known: "mm²/s, cSt, mPa·s, cP, SUS".to_owned(),
            },
            QuantityError::WrongKind { unit, of, example, .. } => {
                QuantityError::WrongKind { unit, of, noun: "viscosity", example }
            }
            other => other,
        })
    }
}

impl std::fmt::Display for ViscosityReading {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        match self {
            Self::Kinematic(v) => v.fmt(f),
            Self::Dynamic(v) => write!(f, "{} mPa·s", shown(v.as_mpa_s())),
            Self::Saybolt(v) => match v.at {
                Some(at) => write!(f, "{} SUS at {at}", shown(v.seconds)),
                None => write!(f, "{} SUS", shown(v.seconds)),
            },
        }
    }
}
