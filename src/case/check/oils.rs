//! The oils of a case: data sheets, or the classes that stand in for them.

use super::super::model::From;
use super::super::policy::Policy;
use super::desk::Desk;
use crate::oil::{Base, Class, ClassGiven, CurveError, Oil, OilData, OilError, saybolt};
use crate::quantity::{Density, Quantity, Temperature, ViscosityReading};

impl Desk<'_> {
    pub(super) fn oils(&mut self, policy: &Policy) -> Vec<Oil> {
        if self.file.oils() == 0 {
            return Class::all()
                .iter()
                .filter_map(|class| Oil::from_class(class, &policy.oil).ok())
                .collect();
        }
        let mut oils = Vec::with_capacity(self.file.oils());
        for number in 1..=self.file.oils() {
            if let Some(oil) = self.oil(number, policy) {
                oils.push(oil);
            }
        }
        let in_service = oils.iter().filter(|oil| oil.in_service()).count();
        if in_service > 1 {
            self.fault(
                "oil[1].in_service",
                format!("{in_service} oils are marked as in service; mark one"),
            );
        }
        oils
    }

    pub(super) fn oil(&mut self, number: usize, policy: &Policy) -> Option<Oil> {
        let key = |name: &str| format!("oil[{number}].{name}");
        let faults_before = self.faults.len();
        let class_text = self.text(&key("class"));
        let class = class_text.as_deref().and_then(Class::named);
        let name = self
            .text(&key("name"))
            .or_else(|| class_text.clone())
            .unwrap_or_else(|| format!("oil {number}"));
        let in_service = self.switch(&key("in_service")).unwrap_or(false);
        let reference_only = self.switch(&key("reference_only"));
        let mut points = self.points(&key("viscosity"));
        let sheet = points.len();
        points.append(&mut self.points(&key("cold_viscosity")));
        let viscosity_index = self.number(&key("viscosity_index"));
        let pour_point = self.given(&key("pour_point"));
        let cloud_point = self.given(&key("cloud_point"));
        let biodegradable = self.switch(&key("biodegradable"));
        let data_sheet = !points.is_empty() || viscosity_index.is_some();

        if !data_sheet && self.faults.len() == faults_before {
            return match (class, class_text) {
                (Some(class), _) => {
                    if self.file.text(&key("base")).is_some() {
                        let base = self.word(&key("base"));
                        if base.is_some_and(|base| base != class.base().id()) {
                            let message = format!(
                                "class {} is {}; give its viscosities where it is another",
                                class.id(),
                                class.base()
                            );
                            self.fault(&key("base"), message);
                        }
                    }
                    let given = ClassGiven {
                        pour_point,
                        cloud_point,
                        flash_point: self.given(&key("flash_point")),
                        density: self.given(&key("density")),
                        biodegradable,
                    };
                    let listed = (name, in_service, reference_only.unwrap_or(false));
                    self.class_oil(number, class, given, listed, policy)
                }
                (None, Some(text)) => {
                    let known: Vec<&str> = Class::all().iter().map(Class::id).collect();
                    self.fault(
                        &key("class"),
                        format!("no class `{text}` is built in, so its viscosities are needed; give `viscosity`, or one of {}", known.join(", ")),
                    );
                    None
                }
                (None, None) => {
                    self.fault(
                        &key("viscosity"),
                        "is missing; give two viscosities, for example `viscosity = { \"40 °C\" = \"46 mm²/s\", \"100 °C\" = \"6.8 mm²/s\" }`, or a `class`",
                    );
                    None
                }
            };
        }
        let base = self.base(number, class_text.as_deref(), &points, viscosity_index);
        let density = self.or_typical::<Density>(
            &key("density"),
            base.typical_density(),
            "typical of the base oil, memory",
        );
        let flash_point = self.flash(number, base, &points);
        if self.faults.len() > faults_before {
            return None;
        }
        let data = OilData {
            name,
            class: class_text,
            in_service,
            base,
            points,
            viscosity_index,
            density: density?,
            pour_point,
            cloud_point,
            flash_point,
            biodegradable,
            reference_only: reference_only.unwrap_or(false),
        };
        self.cold_points_fit(number, &data, sheet, policy);
        if self.faults.len() > faults_before {
            return None;
        }
        match Oil::from_data(data, &policy.oil) {
            Ok(oil) if oil.viscosity_index().is_some_and(|index| !ORDINARY.contains(&index)) => {
                let index = oil.viscosity_index().unwrap_or_default();
                self.fault(
                    &key("viscosity"),
                    format!("gives a viscosity index of {index:.0}, which no oil has; is there a digit too many or too few?"),
                );
                None
            }
            Ok(oil) if !GRADES.contains(&oil.expected(40.0)) => {
                let at_40 = crate::quantity::shown(oil.expected(40.0).round());
                self.fault(
                    &key("viscosity"),
                    format!("comes to {at_40} mm²/s at 40 °C, but the grades of ISO 3448 run from 2 to 3200; is there a digit too many or too few?"),
                );
                None
            }
            Ok(oil) => Some(oil),
            Err(error) => {
                let at = self.blamed(number, &error);
                self.fault(&at, error.to_string());
                None
            }
        }
    }

    /// A viscosity measured in the cold may lie off the line of the data sheet, but not by a digit.
    fn cold_points_fit(&mut self, number: usize, data: &OilData, sheet: usize, policy: &Policy) {
        let (warm, cold) = data.points.split_at(sheet.min(data.points.len()));
        let line = OilData { points: warm.to_vec(), ..data.clone() };
        let Ok(line) = Oil::from_data(line, &policy.oil) else { return };
        let bulk = line.bulk();
        for (at, reading) in cold {
            let t = at.as_celsius();
            let measured = match reading {
                ViscosityReading::Kinematic(value) => value.as_mm2_per_s(),
                ViscosityReading::Dynamic(value) => value.as_mpa_s() * 1000.0 / bulk.density(t),
                ViscosityReading::Saybolt(_) => continue,
            };
            let expected = line.expected(t);
            let ratio = measured / expected;
            if !OFF_THE_LINE.contains(&ratio) {
                let shown = crate::quantity::shown;
                let round = |value: f64| shown(format!("{value:.1e}").parse().unwrap_or(value));
                let key =
                    self.blamed(number, &OilError::Curve(CurveError::SameTemperature { at: t }));
                self.fault(
                    &key,
                    format!(
                        "is {} times the {} mm²/s that the data sheet's figures come to there; is there a digit too many or too few?",
                        round(ratio),
                        round(expected)
                    ),
                );
            }
        }
    }

    /// The key to point at for what is wrong with an oil.
    pub(super) fn blamed(&self, number: usize, error: &OilError) -> String {
        let key = |name: &str| format!("oil[{number}].{name}");
        let point = |celsius: f64| {
            ["viscosity", "cold_viscosity"].iter().find_map(|table| {
                let table = key(table);
                let mut rows = self.file.below(&table).filter(|(at, _)| {
                    at.parse::<Temperature>().is_ok_and(|t| (t.as_celsius() - celsius).abs() < 1e-6)
                });
                rows.next().map(|(at, _)| format!("{table}.{at}"))
            })
        };
        let at = match error {
            OilError::Curve(CurveError::Rises { warm_at: at, .. })
            | OilError::Curve(
                CurveError::SameTemperature { at } | CurveError::OutOfRange { at, .. },
            )
            | OilError::MeasuredBelowPour { at, .. }
            | OilError::TooClose { warm: at, .. } => point(*at),
            OilError::CloudBelowPour { .. } => Some(key("cloud_point")),
            OilError::IndexWithout40 | OilError::IndexOutOfReach { .. } => {
                Some(key("viscosity_index"))
            }
            _ => self
                .file
                .below(&key("viscosity"))
                .next()
                .map(|(at, _)| format!("{}.{at}", key("viscosity"))),
        };
        at.unwrap_or_else(|| key("viscosity"))
    }

    /// An oil of a built-in class without viscosities; what else is known of it wins over the class.
    pub(super) fn class_oil(
        &mut self,
        number: usize,
        class: &'static Class,
        given: ClassGiven,
        (name, in_service, reference_only): (String, bool, bool),
        policy: &Policy,
    ) -> Option<Oil> {
        let oil = match Oil::from_class_and(class, &given, &policy.oil) {
            Ok(oil) => oil,
            Err(error) => {
                let at = self.blamed(number, &error);
                self.fault(&at, error.to_string());
                return None;
            }
        };
        self.assume(
            &format!("oil[{number}].viscosity"),
            format!("class {}: middle of the grade, least index", class.id()),
            class.source(),
        );
        Some(oil.listed(name, in_service, reference_only))
    }

    pub(super) fn points(&mut self, key: &str) -> Vec<(Temperature, ViscosityReading)> {
        let rows: Vec<(String, String)> =
            self.file.below(key).map(|(at, entry)| (at, entry.text.clone())).collect();
        let mut points = Vec::with_capacity(rows.len());
        for (at, text) in rows {
            let row_key = format!("{key}.{at}");
            self.note(&row_key, &text, From::Given);
            match (at.trim_matches('"').parse::<Temperature>(), text.parse::<ViscosityReading>()) {
                (Ok(at), Ok(ViscosityReading::Saybolt(time)))
                    if time.at.is_some_and(|said| (said - at).as_kelvin().abs() > 0.05) =>
                {
                    self.fault(
                        &row_key,
                        format!("`{text}` names another temperature than its own key; keep one of the two"),
                    );
                }
                (Ok(at), Ok(reading)) => points.push((at, reading)),
                (Err(error), _) => self.fault(&row_key, format!("as a temperature: {error}")),
                (_, Err(error)) => self.fault(&row_key, error.to_string()),
            }
        }
        points
    }

    pub(super) fn base(
        &mut self,
        number: usize,
        class: Option<&str>,
        points: &[(Temperature, ViscosityReading)],
        index: Option<f64>,
    ) -> Base {
        let key = format!("oil[{number}].base");
        if self.file.text(&key).is_some() {
            return self.word(&key).and_then(|word| word.parse().ok()).unwrap_or(Base::Other);
        }
        let label = class.map(|class| class.trim().to_uppercase());
        let by_label = label.as_deref().and_then(|label| {
            [
                ("HEES", Base::Ester),
                ("HETG", Base::NaturalEster),
                ("HEPG", Base::Glycol),
                ("HEPR", Base::Pao),
                ("HS", Base::Pao),
                ("HV", Base::PolymerThickened),
                ("HM", Base::Mineral),
                ("HL", Base::Mineral),
            ]
            .into_iter()
            .find(|(letters, _)| label.starts_with(letters))
            .map(|(_, base)| base)
        });
        let (base, source) = match by_label {
            Some(base) => (base, "from the class letters, ISO 6743-4"),
            None => {
                let index = index.or_else(|| index_of(points));
                if index.is_some_and(|index| index <= 120.0) {
                    (Base::Mineral, "viscosity index of 120 or less, this project's judgement")
                } else {
                    (Base::PolymerThickened, "the cautious choice, this project's judgement")
                }
            }
        };
        self.assume(&key, base.to_string(), source);
        base
    }

    pub(super) fn flash(
        &mut self,
        number: usize,
        base: Base,
        points: &[(Temperature, ViscosityReading)],
    ) -> Option<Temperature> {
        let key = format!("oil[{number}].flash_point");
        if self.file.text(&key).is_some() {
            return self.given(&key);
        }
        let kv40 = kinematic_at(points, 40.0)?;
        let typical = crate::oil::typical_flash(base, kv40)?;
        self.or_typical(&key, typical, "least flash point of the class, memory")
    }
}

/// Viscosity indices that oils have, with room on both sides.
const ORDINARY: std::ops::RangeInclusive<f64> = -150.0..=500.0;

/// Viscosity at 40 °C of the thinnest to the thickest grade of ISO 3448, mm²/s.
const GRADES: std::ops::RangeInclusive<f64> = 1.98..=3520.0;

/// Measured over the D341 line of the data sheet: wax thickens by tens, a PAO is thinner by half.
const OFF_THE_LINE: std::ops::RangeInclusive<f64> = 0.125..=50.0;

/// The kinematic viscosity among data-sheet points at a temperature, mm²/s.
fn kinematic_at(points: &[(Temperature, ViscosityReading)], celsius: f64) -> Option<f64> {
    let (at, reading) = points.iter().find(|(at, _)| (at.as_celsius() - celsius).abs() < 1e-6)?;
    match reading {
        ViscosityReading::Kinematic(value) => Some(value.as_mm2_per_s()),
        ViscosityReading::Saybolt(time) => saybolt::viscosity(time.seconds, at.in_unit("°F")?),
        ViscosityReading::Dynamic(_) => None,
    }
}

fn index_of(points: &[(Temperature, ViscosityReading)]) -> Option<f64> {
    crate::oil::viscosity_index(kinematic_at(points, 40.0)?, kinematic_at(points, 100.0)?)
}
