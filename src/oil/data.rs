//! One oil, from its data sheet or from its class.

use super::band::{Band, BandInput, BandPolicy, Base, Reach};
use super::bulk::Bulk;
use super::class::Class;
use super::saybolt;
use super::viscosity_index::{viscosity_at_100, viscosity_index};
use super::walther::{CurveError, ViscosityCurve};
use crate::quantity::{Density, Quantity, Temperature, ViscosityReading};

/// What a data sheet says.
#[derive(Debug, Clone)]
pub struct OilData {
    /// What it is called.
    pub name: String,
    /// Class on the label.
    pub class: Option<String>,
    /// In the machine now.
    pub in_service: bool,
    /// What it is made from.
    pub base: Base,
    /// Viscosities, measured in the cold too.
    pub points: Vec<(Temperature, ViscosityReading)>,
    /// Viscosity index, instead of the viscosity at 100 °C.
    pub viscosity_index: Option<f64>,
    /// Density at 15 °C.
    pub density: Density,
    /// Pour point.
    pub pour_point: Option<Temperature>,
    /// Cloud point.
    pub cloud_point: Option<Temperature>,
    /// Flash point.
    pub flash_point: Option<Temperature>,
    /// Certified biodegradable.
    pub biodegradable: Option<bool>,
    /// Only for comparison.
    pub reference_only: bool,
}

/// Why a data sheet makes no oil.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
#[non_exhaustive]
pub enum OilError {
    /// The viscosities make no curve.
    #[error(transparent)]
    Curve(#[from] CurveError),
    /// An index without the viscosity it belongs to.
    #[error("the viscosity index needs the viscosity at 40 °C beside it")]
    IndexWithout40,
    /// No viscosity at 100 °C gives this index.
    #[error(
        "no viscosity at 100 °C gives an index of {index} with {kv40} mm²/s at 40 °C; check both"
    )]
    IndexOutOfReach {
        /// The index given.
        index: f64,
        /// Viscosity at 40 °C, mm²/s.
        kv40: f64,
    },
    /// A Saybolt time outside the scale.
    #[error("{seconds} SUS is outside the Saybolt Universal scale")]
    Saybolt {
        /// Seconds given.
        seconds: f64,
    },
    /// Two viscosities so close that rounding sets the slope between them.
    #[error(
        "the viscosities at {cold} °C and {warm} °C are under 3 K apart, so rounding would set the slope in the cold; keep one of the two"
    )]
    TooClose {
        /// Colder temperature, °C.
        cold: f64,
        /// Warmer temperature, °C.
        warm: f64,
    },
    /// A viscosity measured where the oil is said not to flow.
    #[error(
        "a viscosity is given at {at} °C, but the pour point is {pour} °C: an oil that was measured flowed; check the two"
    )]
    MeasuredBelowPour {
        /// Temperature of the measurement, °C.
        at: f64,
        /// Pour point, °C.
        pour: f64,
    },
    /// Cloud point under the pour point.
    #[error(
        "the cloud point, {cloud} °C, is under the pour point, {pour} °C; are the two swapped?"
    )]
    CloudBelowPour {
        /// Cloud point, °C.
        cloud: f64,
        /// Pour point, °C.
        pour: f64,
    },
}

/// Least distance of two measured temperatures, K: 100 °F beside 40 °C would set the cold slope by
/// rounding. This project's judgement.
const LEAST_SPACING_K: f64 = 3.0;

/// What is known of an oil that goes by its class otherwise.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct ClassGiven {
    /// Pour point.
    pub pour_point: Option<Temperature>,
    /// Cloud point.
    pub cloud_point: Option<Temperature>,
    /// Flash point.
    pub flash_point: Option<Temperature>,
    /// Density at 15 °C.
    pub density: Option<Density>,
    /// Certified biodegradable.
    pub biodegradable: Option<bool>,
}

/// The likely range at one temperature.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Estimate {
    /// Thin edge, mm²/s; none below the pour point.
    pub low: Option<f64>,
    /// D341 line, mm²/s.
    pub expected: Option<f64>,
    /// Thick edge, mm²/s.
    pub high: Option<f64>,
    /// How far the line was stretched.
    pub reach: Reach,
}

/// One oil.
#[derive(Debug, Clone)]
pub struct Oil {
    name: String,
    class: Option<String>,
    in_service: bool,
    base: Base,
    bulk: Bulk,
    band: Band,
    index: Option<f64>,
    index_differs: bool,
    pour_point: Option<Temperature>,
    flash_point: Option<Temperature>,
    biodegradable: Option<bool>,
    reference_only: bool,
    class_only: bool,
}

impl Oil {
    /// From a data sheet.
    ///
    /// # Errors
    /// Viscosities that make no curve, or figures that contradict each other: see [`OilError`].
    ///
    /// # Source
    /// ASTM D341 for the line, D2270 where the index stands for the 100 °C point, D2161 for SUS.
    pub fn from_data(data: OilData, policy: &BandPolicy) -> Result<Self, OilError> {
        let bulk = Bulk::from_density_15(data.density);
        let mut points = Vec::with_capacity(data.points.len() + 1);
        for (at, reading) in &data.points {
            let t = at.as_celsius();
            let nu = match reading {
                ViscosityReading::Kinematic(value) => value.as_mm2_per_s(),
                ViscosityReading::Dynamic(value) => value.as_mpa_s() / bulk.density(t) * 1000.0,
                ViscosityReading::Saybolt(time) => {
                    let fahrenheit = at.in_unit("°F").unwrap_or(100.0);
                    saybolt::viscosity(time.seconds, fahrenheit)
                        .ok_or(OilError::Saybolt { seconds: time.seconds })?
                }
            };
            points.push((t, nu));
        }
        let at = |wanted: f64| points.iter().find(|(t, _)| (t - wanted).abs() < 1e-6).map(|p| p.1);
        let mut index_differs = false;
        if let Some(index) = data.viscosity_index {
            let kv40 = at(40.0).ok_or(OilError::IndexWithout40)?;
            match at(100.0) {
                Some(kv100) => {
                    index_differs = viscosity_index(kv40, kv100)
                        .is_some_and(|found| (found - index).abs() > 3.0);
                }
                None => {
                    let kv100 = viscosity_at_100(kv40, index)
                        .ok_or(OilError::IndexOutOfReach { index, kv40 })?;
                    points.push((100.0, kv100));
                }
            }
        }
        let pour_c = data.pour_point.map(Temperature::as_celsius);
        let cloud_c = data.cloud_point.map(Temperature::as_celsius);
        if let (Some(cloud), Some(pour)) = (cloud_c, pour_c) {
            if cloud < pour {
                return Err(OilError::CloudBelowPour { cloud, pour });
            }
        }
        let curve = ViscosityCurve::through(&points)?;
        for (cold, warm) in curve.points().iter().zip(curve.points().iter().skip(1)) {
            if warm.0 - cold.0 < LEAST_SPACING_K {
                let round = |t: f64| (t * 100.0).round() / 100.0;
                return Err(OilError::TooClose { cold: round(cold.0), warm: round(warm.0) });
            }
        }
        if let Some(pour) = pour_c {
            let at = curve.coldest().0;
            if at < pour {
                return Err(OilError::MeasuredBelowPour { at, pour });
            }
        }
        let index = viscosity_index(curve.at(40.0), curve.at(100.0));
        let input = BandInput { curve, base: data.base, index, pour_c, cloud_c, class_only: None };
        Ok(Self {
            name: data.name,
            class: data.class,
            in_service: data.in_service,
            base: data.base,
            bulk,
            band: Band::new(input, policy),
            index,
            index_differs,
            pour_point: data.pour_point,
            flash_point: data.flash_point,
            biodegradable: data.biodegradable,
            reference_only: data.reference_only,
            class_only: false,
        })
    }

    /// From a built-in class: the middle of the grade, the least index and the warmest pour point
    /// the class allows, with the spread of the grade on both edges.
    ///
    /// # Errors
    /// A class whose limits make no curve.
    pub fn from_class(class: &Class, policy: &BandPolicy) -> Result<Self, OilError> {
        Self::from_class_and(class, &ClassGiven::default(), policy)
    }

    /// As [`Self::from_class`], with what is known of the oil at hand in place of the class's limits.
    ///
    /// # Errors
    /// As [`Self::from_class`], and a cloud point under the pour point.
    pub fn from_class_and(
        class: &Class,
        given: &ClassGiven,
        policy: &BandPolicy,
    ) -> Result<Self, OilError> {
        let mut points: Vec<(f64, f64)> = class.points().iter().map(|p| (p[0], p[1])).collect();
        if let (Some(index), [(_, kv40)]) = (class.index(), points.as_slice()) {
            let kv40 = *kv40;
            let kv100 =
                viscosity_at_100(kv40, index).ok_or(OilError::IndexOutOfReach { index, kv40 })?;
            points.push((100.0, kv100));
        }
        let curve = ViscosityCurve::through(&points)?;
        let index = viscosity_index(curve.at(40.0), curve.at(100.0));
        // A class with an index stands for a grade; one without is drawn through limits.
        let class_only = class.index().map(|_| class.cold_limit());
        let density = match given.density {
            Some(density) => density,
            None => Density::kg_per_m3(class.density_15())
                .map_err(|_| OilError::Curve(CurveError::TooFewPoints))?,
        };
        let pour_c = given.pour_point.map_or(class.pour_c(), Temperature::as_celsius);
        if let Some(cloud) = given.cloud_point.map(Temperature::as_celsius) {
            if cloud < pour_c {
                return Err(OilError::CloudBelowPour { cloud, pour: pour_c });
            }
        }
        let input = BandInput {
            curve,
            base: class.base(),
            index,
            pour_c: Some(pour_c),
            cloud_c: given.cloud_point.map(Temperature::as_celsius),
            class_only,
        };
        Ok(Self {
            name: class.id().to_owned(),
            class: Some(class.id().to_owned()),
            in_service: false,
            base: class.base(),
            bulk: Bulk::from_density_15(density),
            band: Band::new(input, policy),
            index,
            index_differs: false,
            pour_point: Temperature::celsius(pour_c).ok(),
            flash_point: given.flash_point.or_else(|| Temperature::celsius(class.flash_c()).ok()),
            biodegradable: given.biodegradable.or(Some(class.biodegradable())),
            reference_only: class.reference_only(),
            class_only: true,
        })
    }

    /// The same oil under another name, in service or not, and chosen from or only compared.
    #[must_use]
    pub fn listed(mut self, name: String, in_service: bool, reference_only: bool) -> Self {
        self.name = name;
        self.in_service = in_service;
        self.reference_only = reference_only;
        self
    }

    /// What it is called.
    #[must_use]
    pub fn name(&self) -> &str {
        &self.name
    }

    /// Class on the label.
    #[must_use]
    pub fn class(&self) -> Option<&str> {
        self.class.as_deref()
    }

    /// In the machine now.
    #[must_use]
    pub const fn in_service(&self) -> bool {
        self.in_service
    }

    /// What it is made from.
    #[must_use]
    pub const fn base(&self) -> Base {
        self.base
    }

    /// Bulk properties.
    #[must_use]
    pub const fn bulk(&self) -> &Bulk {
        &self.bulk
    }

    /// The D341 curve.
    #[must_use]
    pub const fn curve(&self) -> &ViscosityCurve {
        self.band.curve()
    }

    /// Viscosity index, not rounded; `None` where it is not defined.
    #[must_use]
    pub const fn viscosity_index(&self) -> Option<f64> {
        self.index
    }

    /// The index given and the viscosity at 100 °C given differ by more than 3.
    #[must_use]
    pub const fn index_differs(&self) -> bool {
        self.index_differs
    }

    /// Pour point.
    #[must_use]
    pub const fn pour_point(&self) -> Option<Temperature> {
        self.pour_point
    }

    /// Flash point.
    #[must_use]
    pub const fn flash_point(&self) -> Option<Temperature> {
        self.flash_point
    }

    /// Certified biodegradable.
    #[must_use]
    pub const fn biodegradable(&self) -> Option<bool> {
        self.biodegradable
    }

    /// Only for comparison.
    #[must_use]
    pub const fn reference_only(&self) -> bool {
        self.reference_only
    }

    /// Known by its class alone, without a data sheet.
    #[must_use]
    pub const fn class_only(&self) -> bool {
        self.class_only
    }

    /// The D341 line at a temperature in °C, mm²/s.
    #[must_use]
    pub fn expected(&self, celsius: f64) -> f64 {
        self.band.expected(celsius)
    }

    /// The thick edge at a temperature in °C, mm²/s.
    #[must_use]
    pub fn high(&self, celsius: f64) -> f64 {
        self.band.high(celsius)
    }

    /// The thin edge at a temperature in °C, mm²/s.
    #[must_use]
    pub fn low(&self, celsius: f64) -> f64 {
        self.band.low(celsius)
    }

    /// The likely range at a temperature: no numbers where the oil is below its pour point + 5 K
    /// and was not measured.
    #[must_use]
    pub fn estimate(&self, celsius: f64) -> Estimate {
        let reach = self.band.reach(celsius);
        let number = |value: f64| (reach != Reach::BelowPour).then_some(value);
        Estimate {
            low: number(self.low(celsius)),
            expected: number(self.expected(celsius)),
            high: number(self.high(celsius)),
            reach,
        }
    }
}
