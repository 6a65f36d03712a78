//! The quantity types, one macro row each.

use super::error::QuantityError;
use super::number::shown;
use super::spelling::trim;
use super::units::{self, Dimension};
use super::{pressure, read};

/// What one quantity type is: its noun, unit, range and an example to type.
#[derive(Debug)]
pub struct Kind {
    /// The noun used in messages.
    pub noun: &'static str,
    /// The unit it is stored and shown in.
    pub unit: &'static str,
    /// Units it can be read in.
    pub dimension: &'static Dimension,
    /// Least value accepted, in `unit`.
    pub least: f64,
    /// Greatest value accepted, in `unit`.
    pub greatest: f64,
    /// A text that can be typed for it.
    pub example: &'static str,
    reader: fn(&Self, &str) -> Result<f64, QuantityError>,
}

impl Kind {
    /// Reads a text to a value in [`Kind::unit`].
    ///
    /// # Errors
    /// No number, no unit, an unknown unit, or a value out of range: see [`QuantityError`].
    pub fn read(&self, text: &str) -> Result<f64, QuantityError> {
        (self.reader)(self, text)
    }

    /// Checks a value that already is in [`Kind::unit`].
    ///
    /// # Errors
    /// [`QuantityError::OutOfRange`], also for a value that is not finite.
    pub fn check(&self, value: f64) -> Result<f64, QuantityError> {
        self.check_found(value, || format!("{} {}", shown(value), self.unit))
    }

    /// Checks a value that was read. Rounding in a conversion may step over the end of the range by
    /// a hair: that is the end.
    pub(super) fn check_read(&self, value: f64, text: &str) -> Result<f64, QuantityError> {
        let inside = value.clamp(self.least, self.greatest);
        let hair = 1e-12 * inside.abs();
        let value = if (value - inside).abs() <= hair { inside } else { value };
        self.check_found(value, || trim(text).to_owned())
    }

    fn check_found(&self, value: f64, found: impl Fn() -> String) -> Result<f64, QuantityError> {
        if value >= self.least && value <= self.greatest {
            return Ok(value);
        }
        Err(QuantityError::OutOfRange {
            noun: self.noun,
            least: shown(self.least),
            greatest: shown(self.greatest),
            unit: self.unit,
            found: found(),
        })
    }

    /// A value in [`Kind::unit`] expressed in another unit of the same dimension.
    #[must_use]
    pub fn in_unit(&self, value: f64, unit: &str) -> Option<f64> {
        let (from, to) = (self.dimension.unit(self.unit)?, self.dimension.unit(unit)?);
        Some(read::between(value, from, to))
    }
}

/// A quantity type: built from a number in its own unit or from text with any known unit.
pub trait Quantity: Copy + std::fmt::Display + std::str::FromStr<Err = QuantityError> {
    /// The kind's noun, unit, range and units.
    const KIND: &'static Kind;

    /// From a value in the kind's own unit.
    ///
    /// # Errors
    /// A value out of the kind's range or not finite.
    fn of(value: f64) -> Result<Self, QuantityError>;

    /// The value in the kind's own unit.
    fn value(self) -> f64;

    /// The value in another unit of the same dimension; `None` if there is no such unit.
    fn in_unit(self, unit: &str) -> Option<f64> {
        Self::KIND.in_unit(self.value(), unit)
    }
}

macro_rules! quantity {
    ($(
        $(#[$doc:meta])*
        $name:ident: $noun:literal in $unit:literal, $least:literal ..= $greatest:literal,
        new $new:ident, get $get:ident, of $dimension:ident, example $example:literal
        $(, reader $reader:path)?;
    )*) => {$(
        $(#[$doc])*
        #[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
        pub struct $name(f64);

        impl $name {
            #[doc = concat!("A ", $noun, " from its value in ", $unit, ".")]
            ///
            /// # Errors
            #[doc = concat!("Not finite, or outside ", stringify!($least), " to ", stringify!($greatest), " ", $unit, ".")]
            pub fn $new(value: f64) -> Result<Self, QuantityError> {
                Self::KIND.check(value).map(Self)
            }

            #[doc = concat!("The value in ", $unit, ".")]
            #[must_use]
            pub const fn $get(self) -> f64 {
                self.0
            }
        }

        impl Quantity for $name {
            const KIND: &'static Kind = &Kind {
                noun: $noun,
                unit: $unit,
                dimension: &units::$dimension,
                least: $least,
                greatest: $greatest,
                example: $example,
                reader: quantity!(@reader $($reader)?),
            };

            fn of(value: f64) -> Result<Self, QuantityError> {
                Self::$new(value)
            }

            fn value(self) -> f64 {
                self.0
            }
        }

        impl std::str::FromStr for $name {
            type Err = QuantityError;

            fn from_str(text: &str) -> Result<Self, QuantityError> {
                Self::KIND.read(text).map(Self)
            }
        }

        impl std::fmt::Display for $name {
            fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
                write!(f, "{} {}", shown(self.0), $unit)
            }
        }
    )*

    /// Every quantity kind there is.
    pub static KINDS: &[&Kind] = &[$($name::KIND),*];
    };
    (@reader) => { read::plain };
    (@reader $reader:path) => { $reader };
}

quantity! {
    /// A temperature on the Celsius scale: a reading, not a difference.
    Temperature: "temperature" in "°C", -90.0 ..= 400.0,
    new celsius, get as_celsius, of TEMPERATURE, example "-38 °C";

    /// A difference between two temperatures.
    TemperatureDifference: "temperature difference" in "K", -500.0 ..= 500.0,
    new kelvin, get as_kelvin, of TEMPERATURE_DIFFERENCE, example "10 K";

    /// A kinematic viscosity.
    KinematicViscosity: "kinematic viscosity" in "mm²/s", 0.21 ..= 2e7,
    new mm2_per_s, get as_mm2_per_s, of KINEMATIC_VISCOSITY, example "46 mm²/s";

    /// A density, or the density equal to a specific gravity against water at 60 °F.
    Density: "density" in "kg/m³", 600.0 ..= 1500.0,
    new kg_per_m3, get as_kg_per_m3, of DENSITY, example "875 kg/m³", reader read::density;

    /// An absolute pressure. `5 inHg vacuum` is read as 101.325 kPa less 5 inHg.
    AbsolutePressure: "absolute pressure" in "kPa", 0.0 ..= 1000.0,
    new kpa, get as_kpa, of PRESSURE, example "60 kPa", reader pressure::absolute;

    /// A gauge pressure: over (or under) the atmosphere outside.
    GaugePressure: "gauge pressure" in "kPa", -101.0 ..= 100000.0,
    new kpa, get as_kpa, of PRESSURE, example "25 bar", reader pressure::gauge;

    /// A difference between two pressures, such as a loss.
    PressureDifference: "pressure difference" in "kPa", 0.0 ..= 10000.0,
    new kpa, get as_kpa, of PRESSURE, example "2.5 kPa", reader pressure::difference;

    /// An inside diameter of hose or pipe, or the diameter of a heater rod.
    Bore: "diameter" in "mm", 1.0 ..= 1000.0,
    new mm, get as_mm, of LENGTH, example "50.8 mm", reader read::compound;

    /// A thickness of insulation.
    Thickness: "thickness" in "mm", 0.0 ..= 500.0,
    new mm, get as_mm, of LENGTH, example "25 mm", reader read::compound;

    /// A length or height. Negative only where a height may be below its reference.
    Length: "length" in "m", -50.0 ..= 100.0,
    new m, get as_m, of LENGTH, example "1.5 m", reader read::compound;

    /// Height of the site above sea level.
    Elevation: "elevation" in "m", -430.0 ..= 9000.0,
    new m, get as_m, of LENGTH, example "640 m", reader read::compound;

    /// An area.
    Area: "area" in "m²", 0.0001 ..= 1000.0,
    new m2, get as_m2, of AREA, example "2.36 m²";

    /// A volume of oil.
    Volume: "volume" in "L", 0.1 ..= 1000000.0,
    new litres, get as_litres, of VOLUME, example "200 L", reader read::fraction;

    /// A pump displacement per revolution.
    Displacement: "displacement" in "cm³", 0.1 ..= 10000.0,
    new cm3, get as_cm3, of DISPLACEMENT, example "75 cm³";

    /// A mass.
    Mass: "mass" in "kg", 0.0 ..= 1000000.0,
    new kg, get as_kg, of MASS, example "40 kg";

    /// A power.
    Power: "power" in "W", 0.0 ..= 10000000.0,
    new watts, get as_watts, of POWER, example "1500 W", reader read::fraction;

    /// A voltage.
    Voltage: "voltage" in "V", 1.0 ..= 1000.0,
    new volts, get as_volts, of VOLTAGE, example "230 V";

    /// An electric current.
    Current: "current" in "A", 0.1 ..= 10000.0,
    new amperes, get as_amperes, of CURRENT, example "16 A";

    /// A span of time.
    TimeSpan: "time" in "h", 0.0 ..= 10000.0,
    new hours, get as_hours, of TIME, example "4 h", reader read::compound;

    /// A rotational speed.
    Rotation: "rotational speed" in "rpm", 1.0 ..= 20000.0,
    new rpm, get as_rpm, of ROTATION, example "1000 rpm";

    /// A volume flow.
    Flow: "flow" in "L/min", 0.001 ..= 100000.0,
    new litres_per_min, get as_litres_per_min, of FLOW, example "150 L/min";

    /// A wind speed.
    Velocity: "wind speed" in "m/s", 0.0 ..= 80.0,
    new m_per_s, get as_m_per_s, of VELOCITY, example "3 m/s";

    /// A thermal conductivity.
    ThermalConductivity: "thermal conductivity" in "W/(m·K)", 0.005 ..= 500.0,
    new w_per_m_k, get as_w_per_m_k, of THERMAL_CONDUCTIVITY, example "0.040 W/(m·K)";

    /// A heat transfer coefficient (U value).
    HeatTransferCoefficient: "heat transfer coefficient" in "W/(m²·K)", 0.01 ..= 1000.0,
    new w_per_m2_k, get as_w_per_m2_k, of HEAT_TRANSFER_COEFFICIENT, example "7 W/(m²·K)";

    /// A heat loss per kelvin over the air.
    HeatLossRate: "heat loss rate" in "W/K", 0.0 ..= 100000.0,
    new w_per_k, get as_w_per_k, of HEAT_LOSS_RATE, example "40 W/K";

    /// Heat per area of a heating element.
    WattDensity: "watt density" in "W/cm²", 0.001 ..= 100.0,
    new w_per_cm2, get as_w_per_cm2, of WATT_DENSITY, example "0.7 W/cm²";
}

impl std::ops::Sub for Temperature {
    type Output = TemperatureDifference;

    /// The difference; always inside its range.
    fn sub(self, other: Self) -> TemperatureDifference {
        TemperatureDifference(self.0 - other.0)
    }
}

impl TimeSpan {
    /// The value in seconds.
    #[must_use]
    pub const fn as_seconds(self) -> f64 {
        self.0 * 3600.0
    }
}
