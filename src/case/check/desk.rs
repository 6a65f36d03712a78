//! One check under way: values read by their readers, gaps filled, faults gathered.
//!
//! Invariant: [`Desk::assume`] is the only place where an assumption is born.

use super::super::clock::Clock;
use super::super::fault::Fault;
use super::super::file::CaseFile;
use super::super::keys::{self, KeyKind};
use super::super::model::{Assumption, From, Input};
use super::TRADE;
use crate::climate::Sites;
use crate::oil::saybolt;
use crate::quantity::{KinematicViscosity, Quantity, ViscosityReading, shown};

/// One check under way: the file, and what was found so far.
pub(super) struct Desk<'a> {
    pub(super) file: &'a CaseFile,
    pub(super) sites: &'a dyn Sites,
    pub(super) faults: Vec<Fault>,
    pub(super) assumptions: Vec<Assumption>,
    pub(super) inputs: Vec<Input>,
}

impl Desk<'_> {
    pub(super) fn fault(&mut self, key: &str, message: impl Into<String>) {
        let place = self.file.place(key);
        self.faults.push(Fault { place, key: key.to_owned(), message: message.into() });
    }

    pub(super) fn missing(&mut self, key: &str) {
        let example = keys::find(key).map(|key| key.example).unwrap_or_default();
        let last = key.rsplit('.').next().unwrap_or(key);
        self.fault(key, format!("is missing; write for example `{last} = {example}`"));
    }

    pub(super) fn note(&mut self, key: &str, value: &str, from: From) {
        self.inputs.push(Input { key: key.to_owned(), value: value.to_owned(), from });
    }

    /// The text of a key, noted as given.
    pub(super) fn text(&mut self, key: &str) -> Option<String> {
        let text = self.file.text(key)?.to_owned();
        self.note(key, &text, From::Given);
        Some(text)
    }

    /// A value read by its own reader.
    pub(super) fn read<T, E: std::fmt::Display>(
        &mut self,
        key: &str,
        reader: impl FnOnce(&str) -> Result<T, E>,
    ) -> Option<T> {
        let text = self.text(key)?;
        match reader(&text) {
            Ok(value) => Some(value),
            Err(message) => {
                self.fault(key, message.to_string());
                None
            }
        }
    }

    pub(super) fn given<Q: Quantity>(&mut self, key: &str) -> Option<Q> {
        self.read(key, str::parse::<Q>)
    }

    pub(super) fn required<Q: Quantity>(&mut self, key: &str) -> Option<Q> {
        if self.file.text(key).is_none() {
            self.missing(key);
        }
        self.given(key)
    }

    /// Fills a gap: the one birthplace of assumptions.
    pub(super) fn assume(&mut self, key: &str, value: String, source: &str) {
        let ask = keys::find(key).map(|key| key.find).unwrap_or_default().to_owned();
        self.note(key, &value, From::Typical);
        self.assumptions.push(Assumption {
            key: key.to_owned(),
            value,
            source: source.to_owned(),
            ask,
        });
    }

    /// The value given, or a typical one in the kind's own unit.
    pub(super) fn or_typical<Q: Quantity>(
        &mut self,
        key: &str,
        typical: f64,
        source: &str,
    ) -> Option<Q> {
        if self.file.text(key).is_some() {
            return self.given(key);
        }
        // Six figures are enough for a typical value, and what is shown is what is used.
        let value = shown(typical).parse().map_or(typical, |value: f64| value);
        match Q::of(value) {
            Ok(value) => {
                self.assume(key, value.to_string(), source);
                Some(value)
            }
            Err(error) => {
                self.fault(key, format!("no typical value fits ({error}); give the figure"));
                None
            }
        }
    }

    pub(super) fn viscosity(&mut self, key: &str) -> Option<KinematicViscosity> {
        self.read(key, |text| match text.parse::<ViscosityReading>().map_err(|e| e.to_string())? {
            ViscosityReading::Kinematic(value) => Ok(value),
            ViscosityReading::Saybolt(time) => {
                let fahrenheit = time.at.and_then(|at| at.in_unit("°F")).unwrap_or(100.0);
                let value = saybolt::viscosity(time.seconds, fahrenheit)
                    .ok_or_else(|| format!("`{text}` is outside the Saybolt Universal scale"))?;
                KinematicViscosity::mm2_per_s(value).map_err(|e| e.to_string())
            }
            ViscosityReading::Dynamic(_) => Err(format!(
                "`{text}` is a dynamic viscosity, but a kinematic one is needed; write for example `1600 mm²/s`"
            )),
        })
    }

    pub(super) fn viscosity_or(&mut self, key: &str, typical: f64) -> Option<KinematicViscosity> {
        if self.file.text(key).is_some() {
            return self.viscosity(key);
        }
        self.or_typical(key, typical, TRADE)
    }

    pub(super) fn switch(&mut self, key: &str) -> Option<bool> {
        self.read(key, |text| match text {
            "true" | "yes" => Ok(true),
            "false" | "no" => Ok(false),
            _ => Err(format!("takes true or false, but is `{text}`")),
        })
    }

    /// One of the words the key table lists.
    pub(super) fn word(&mut self, key: &str) -> Option<String> {
        let Some(KeyKind::Choice(words)) = keys::find(key).map(|key| key.kind) else {
            return None;
        };
        self.read(key, |text| {
            let wanted = text.trim().to_lowercase().replace([' ', '_'], "-");
            if words.contains(&wanted.as_str()) {
                return Ok(wanted);
            }
            let near = words
                .iter()
                .map(|word| (strsim::jaro_winkler(&wanted, word), word))
                .max_by(|a, b| a.0.total_cmp(&b.0))
                .filter(|(likeness, _)| *likeness > 0.75);
            Err(match near {
                Some((_, word)) => format!(
                    "`{text}` is unknown; did you mean `{word}`? (one of {})",
                    words.join(", ")
                ),
                None => format!("`{text}` is unknown; write one of {}", words.join(", ")),
            })
        })
    }

    pub(super) fn word_or(&mut self, key: &str, typical: &str, source: &str) -> Option<String> {
        if self.file.text(key).is_some() {
            return self.word(key);
        }
        self.assume(key, typical.to_owned(), source);
        Some(typical.to_owned())
    }

    pub(super) fn clock(&mut self, key: &str) -> Option<Clock> {
        self.read(key, str::parse::<Clock>)
    }

    pub(super) fn number(&mut self, key: &str) -> Option<f64> {
        let Some(KeyKind::Number(least, greatest)) = keys::find(key).map(|key| key.kind) else {
            return None;
        };
        self.read(key, |text| match text.replace(',', ".").parse::<f64>() {
            Ok(value) if (least..=greatest).contains(&value) => Ok(value),
            _ => Err(format!(
                "takes a number from {} to {}, but is `{text}`",
                shown(least),
                shown(greatest)
            )),
        })
    }
}
