//! From a case file to a checked case: values read, gaps filled, contradictions named.
//!
//! Invariant: this is the only place where an assumption is born.

mod desk;
mod machine;
mod oils;

use super::fault::Faults;
use super::file::CaseFile;
use super::model::{Case, Circuit, Duty, Pump, Reservoir, Site, Units};
use crate::climate::{BuiltIn, Sites};
use crate::quantity::Quantity;
use desk::Desk;
use std::sync::Arc;

impl CaseFile {
    /// Checks the file and fills what is not given from typical values.
    ///
    /// # Errors
    /// Everything that is wrong, at once: unknown keys, values that cannot be read, required keys
    /// that are missing, contradictions.
    pub fn check(&self) -> Result<Case, Faults> {
        self.check_in(&BuiltIn)
    }

    /// As [`Self::check`], with other sites than the built-in ones to take a climate from.
    ///
    /// # Errors
    /// As [`Self::check`], and a climate of that name that cannot be read.
    pub fn check_in(&self, sites: &dyn Sites) -> Result<Case, Faults> {
        let mut desk = Desk {
            file: self,
            sites,
            faults: Vec::new(),
            assumptions: Vec::new(),
            inputs: Vec::new(),
        };
        let case = desk.case();
        match case {
            Some(case) if desk.faults.is_empty() && self.faults.is_empty() => Ok(case),
            _ => Err(self.sorted(desk.faults)),
        }
    }
}

/// Where a typical value comes from.
const TRADE: &str = "common practice";
const JUDGEMENT: &str = "this project's judgement";

impl Desk<'_> {
    fn case(&mut self) -> Option<Case> {
        self.format();
        let title = self.text("title").unwrap_or_else(|| self.file.name().to_owned());
        let units = match self.word("units").as_deref() {
            Some("us") => Units::Us,
            _ => Units::Metric,
        };
        let policy = self.policy();
        let site = self.site();
        let machine = self.machine();
        let pump = self.pump();
        let suction = self.suction(&policy);
        let unproven_start_max = match (&site, &pump) {
            (Some(site), Some(pump)) if suction.is_none() || pump.displacement.is_none() => {
                Some(self.unproven_start_max(site, pump, &policy))
            }
            _ => None,
        };
        let case_drain = self.case_drain();
        let reservoir = self.reservoir();
        let circuit = self.circuit(reservoir.as_ref());
        let duty = self.duty();
        let supply = self.supply();
        let tariff = self.number("supply.tariff");
        let heater_sizes = self.heater_sizes();
        let element = self.element();
        let oils = self.oils(&policy);
        self.contradictions(
            site.as_ref(),
            pump.as_ref(),
            reservoir.as_ref(),
            circuit.as_ref(),
            duty.as_ref(),
        );
        Some(Case {
            title,
            units,
            site: site?,
            machine,
            pump: pump?,
            suction,
            unproven_start_max,
            case_drain,
            reservoir: reservoir?,
            circuit: circuit?,
            duty: duty?,
            supply,
            tariff,
            heater_sizes,
            element: element?,
            oils,
            policy,
            assumptions: std::mem::take(&mut self.assumptions),
            inputs: std::mem::take(&mut self.inputs),
            file: Arc::new(self.file.clone()),
        })
    }

    fn contradictions(
        &mut self,
        site: Option<&Site>,
        pump: Option<&Pump>,
        reservoir: Option<&Reservoir>,
        circuit: Option<&Circuit>,
        duty: Option<&Duty>,
    ) {
        if let Some(site) = site {
            if site.heating < site.minimum {
                self.fault(
                    "site.heating_temperature",
                    format!(
                        "{} is colder than the minimum, {}; the minimum is the coldest",
                        site.heating, site.minimum
                    ),
                );
            }
        }
        if let Some(pump) = pump {
            self.ordered(
                "pump.work_speed",
                pump.work_speed,
                "pump.start_speed",
                pump.start_speed,
                "under",
            );
            self.ordered(
                "pump.viscosity_start_max",
                pump.viscosity_start_max,
                "pump.viscosity_work_max",
                pump.viscosity_work_max,
                "under",
            );
            self.ordered(
                "pump.viscosity_min",
                pump.viscosity_min,
                "pump.viscosity_min_short",
                pump.viscosity_min_short,
                "under",
            );
            self.ordered(
                "pump.inlet_pressure_work_min",
                pump.inlet_work_min,
                "pump.inlet_pressure_start_min",
                pump.inlet_start_min,
                "under",
            );
            if pump.viscosity_work_max.as_mm2_per_s() <= pump.viscosity_min.as_mm2_per_s() {
                self.fault(
                    "pump.viscosity_min",
                    format!(
                        "{} is not under the thickest at work, {}",
                        pump.viscosity_min, pump.viscosity_work_max
                    ),
                );
            }
        }
        if let (Some(tank), Some(circuit)) = (reservoir, circuit) {
            self.ordered(
                "circuit.oil_volume",
                circuit.oil_volume,
                "reservoir.oil_volume",
                tank.oil_volume,
                "under",
            );
            self.ordered(
                "circuit.steel_mass",
                circuit.steel_mass,
                "reservoir.steel_mass",
                tank.steel_mass,
                "under",
            );
        }
        if let (Some(site), Some(duty)) = (site, duty) {
            if duty.parked_oil.is_some_and(|oil| oil < site.minimum) {
                self.fault(
                    "duty.parked_oil",
                    format!("is colder than the site minimum, {}", site.minimum),
                );
            }
            if duty.oil_temperature_max <= site.minimum {
                self.fault(
                    "duty.oil_temperature_max",
                    format!("is not over the site minimum, {}", site.minimum),
                );
            }
        }
    }

    /// `large` must not be under `small`. The fault is told where a figure was given.
    fn ordered<Q: Quantity + PartialOrd>(
        &mut self,
        large_key: &str,
        large: Q,
        small_key: &str,
        small: Q,
        word: &str,
    ) {
        if large < small {
            let key = if self.file.text(large_key).is_some() { large_key } else { small_key };
            let message = format!(
                "{large_key} ({large}) is {word} {small_key} ({small}); are the two swapped?"
            );
            self.fault(key, message);
        }
    }
}
