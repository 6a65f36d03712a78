//! From a case file to a checked case: values read, gaps filled, contradictions named.
//!
//! Invariant: this is the only place where an assumption is born.

use super::clock::Clock;
use super::fault::{Fault, Faults};
use super::file::CaseFile;
use super::keys::{self, KeyKind};
use super::model::{
    Assumption, Case, CaseDrain, Circuit, Cooldown, Duty, Element, FluidKind, From, Input, Machine,
    MinimumHow, Prefer, Pump, Reservoir, Site, Supply, Units,
};
use super::policy::Policy;
use crate::oil::{Base, Class, CurveError, Oil, OilData, OilError, saybolt};
use crate::pump::{Fitting, Neutral, PumpKind, Strainer, SuctionLine};
use crate::quantity::{
    AbsolutePressure, Density, KinematicViscosity, Power, Quantity, Temperature, ViscosityReading,
    shown,
};

impl CaseFile {
    /// Checks the file and fills what is not given from typical values.
    ///
    /// # Errors
    /// Everything that is wrong, at once: unknown keys, values that cannot be read, required keys
    /// that are missing, contradictions.
    pub fn check(&self) -> Result<Case, Faults> {
        let mut desk =
            Desk { file: self, faults: Vec::new(), assumptions: Vec::new(), inputs: Vec::new() };
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

/// One check under way: the file, and what was found so far.
struct Desk<'a> {
    file: &'a CaseFile,
    faults: Vec<Fault>,
    assumptions: Vec<Assumption>,
    inputs: Vec<Input>,
}

impl Desk<'_> {
    fn fault(&mut self, key: &str, message: impl Into<String>) {
        let place = self.file.place(key);
        self.faults.push(Fault { place, key: key.to_owned(), message: message.into() });
    }

    fn missing(&mut self, key: &str) {
        let example = keys::find(key).map(|key| key.example).unwrap_or_default();
        let last = key.rsplit('.').next().unwrap_or(key);
        self.fault(key, format!("is missing; write for example `{last} = {example}`"));
    }

    fn note(&mut self, key: &str, value: &str, from: From) {
        self.inputs.push(Input { key: key.to_owned(), value: value.to_owned(), from });
    }

    /// The text of a key, noted as given.
    fn text(&mut self, key: &str) -> Option<String> {
        let text = self.file.text(key)?.to_owned();
        self.note(key, &text, From::Given);
        Some(text)
    }

    /// A value read by its own reader.
    fn read<T, E: std::fmt::Display>(
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

    fn given<Q: Quantity>(&mut self, key: &str) -> Option<Q> {
        self.read(key, str::parse::<Q>)
    }

    fn required<Q: Quantity>(&mut self, key: &str) -> Option<Q> {
        if self.file.text(key).is_none() {
            self.missing(key);
        }
        self.given(key)
    }

    /// Fills a gap: the one birthplace of assumptions.
    fn assume(&mut self, key: &str, value: String, source: &str) {
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
    fn or_typical<Q: Quantity>(&mut self, key: &str, typical: f64, source: &str) -> Option<Q> {
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

    fn viscosity(&mut self, key: &str) -> Option<KinematicViscosity> {
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

    fn viscosity_or(&mut self, key: &str, typical: f64) -> Option<KinematicViscosity> {
        if self.file.text(key).is_some() {
            return self.viscosity(key);
        }
        self.or_typical(key, typical, TRADE)
    }

    fn switch(&mut self, key: &str) -> Option<bool> {
        self.read(key, |text| match text {
            "true" | "yes" => Ok(true),
            "false" | "no" => Ok(false),
            _ => Err(format!("takes true or false, but is `{text}`")),
        })
    }

    /// One of the words the key table lists.
    fn word(&mut self, key: &str) -> Option<String> {
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

    fn word_or(&mut self, key: &str, typical: &str, source: &str) -> Option<String> {
        if self.file.text(key).is_some() {
            return self.word(key);
        }
        self.assume(key, typical.to_owned(), source);
        Some(typical.to_owned())
    }

    fn clock(&mut self, key: &str) -> Option<Clock> {
        self.read(key, str::parse::<Clock>)
    }

    fn number(&mut self, key: &str) -> Option<f64> {
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
        let case_drain = self.case_drain();
        let reservoir = self.reservoir();
        let circuit = self.circuit(reservoir.as_ref());
        let duty = self.duty();
        let supply = self.supply();
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
            case_drain,
            reservoir: reservoir?,
            circuit: circuit?,
            duty: duty?,
            supply,
            heater_sizes,
            element: element?,
            oils,
            policy,
            assumptions: std::mem::take(&mut self.assumptions),
            inputs: std::mem::take(&mut self.inputs),
        })
    }

    fn format(&mut self) {
        match self.file.text("format") {
            None => self.missing("format"),
            Some("1") => {}
            Some(other) => {
                let message = format!("this program reads format 1, but the file says {other}");
                self.fault("format", message);
            }
        }
    }

    fn policy(&mut self) -> Policy {
        let mut policy = Policy::default();
        for row in super::policy::ROWS {
            let Some(text) = self.file.text(row.path).map(str::to_owned) else { continue };
            match row.read(&text) {
                Ok(value) => {
                    (row.set)(&mut policy, value);
                    self.note(row.path, &text, From::Policy);
                }
                Err(message) => self.fault(row.path, message),
            }
        }
        policy
    }

    fn site(&mut self) -> Option<Site> {
        let climate = self.text("site.climate");
        let minimum = match (self.file.text("site.minimum_temperature"), &climate) {
            (Some(_), _) => self.minimum("site.minimum_temperature"),
            (None, None) => {
                self.missing("site.minimum_temperature");
                None
            }
            (None, Some(name)) => {
                let message = format!(
                    "is missing, and no climate `{name}` is known to take it from; write for example `minimum_temperature = \"-38 °C\"`"
                );
                self.fault("site.minimum_temperature", message);
                None
            }
        };
        let (heating, heating_how) = if self.file.text("site.heating_temperature").is_some() {
            (self.minimum("site.heating_temperature"), MinimumHow::Given)
        } else {
            if let Some(minimum) = minimum {
                self.assume("site.heating_temperature", minimum.to_string(), "the minimum itself");
            }
            (minimum, MinimumHow::AsMinimum)
        };
        let wind = self.or_typical("site.wind", 2.0, JUDGEMENT);
        let elevation = self.or_typical("site.elevation", 0.0, "sea level");
        let clear_sky = self.switch("site.clear_sky").unwrap_or(false);
        Some(Site {
            climate,
            minimum: minimum?,
            minimum_how: MinimumHow::Given,
            heating: heating?,
            heating_how,
            wind: wind?,
            elevation: elevation?,
            clear_sky,
        })
    }

    /// A site temperature given as a figure. A minimum from records needs a climate.
    fn minimum(&mut self, key: &str) -> Option<Temperature> {
        self.read(key, |text| {
            if text == "record" || text.contains('%') || text.starts_with("once in") {
                return Err(format!(
                    "`{text}` needs a climate with records; write the figure, for example `-38 °C`"
                ));
            }
            text.parse::<Temperature>().map_err(|e| e.to_string())
        })
    }

    fn machine(&mut self) -> Machine {
        let engine = self.word("machine.engine");
        let intake_heater = self.switch("machine.intake_heater");
        let hose_rating = self.given("machine.hose_rating");
        let pump_heated = self.switch("machine.pump_heated").unwrap_or(false);
        let precharge = self.given("machine.accumulator.precharge");
        let at = self.given("machine.accumulator.at");
        match (precharge.is_some(), at.is_some()) {
            (true, false) => self.missing("machine.accumulator.at"),
            (false, true) => self.missing("machine.accumulator.precharge"),
            _ => {}
        }
        Machine { engine, intake_heater, hose_rating, pump_heated, accumulator: precharge.zip(at) }
    }

    fn pump(&mut self) -> Option<Pump> {
        if self.file.text("pump.kind").is_none() {
            self.missing("pump.kind");
        }
        let kind = self.word("pump.kind").and_then(|word| word.parse::<PumpKind>().ok());
        let neutral = self.word("pump.neutral").and_then(|word| word.parse::<Neutral>().ok());
        let displacement = self.given("pump.displacement");
        let charge_pressure = self.given("pump.charge_pressure");
        if charge_pressure.is_some() && neutral != Some(Neutral::ClosedLoop) {
            self.fault(
                "pump.charge_pressure",
                "belongs to a closed loop; set `pump.neutral = \"closed-loop\"` or leave it out",
            );
        }
        let start_speed = self.or_typical("pump.start_speed", 1000.0, TRADE);
        let work_speed = self.or_typical("pump.work_speed", 2000.0, TRADE);
        let inlet_work_assumed = self.file.text("pump.inlet_pressure_work_min").is_none();
        // Without a kind the limits given are still read, so that their faults are told.
        let limits = kind.unwrap_or(PumpKind::AxialPiston).limits()?;
        let viscosity_start_max =
            self.viscosity_or("pump.viscosity_start_max", limits.viscosity_start_max.typical);
        let viscosity_work_max =
            self.viscosity_or("pump.viscosity_work_max", limits.viscosity_work_max.typical);
        let viscosity_min = self.viscosity_or("pump.viscosity_min", limits.viscosity_min.typical);
        let viscosity_min_short =
            self.viscosity_or("pump.viscosity_min_short", limits.viscosity_min_short.typical);
        let inlet_start_min = self.or_typical::<AbsolutePressure>(
            "pump.inlet_pressure_start_min",
            limits.inlet_pressure_start_min.typical,
            TRADE,
        );
        let inlet_work_min = self.or_typical::<AbsolutePressure>(
            "pump.inlet_pressure_work_min",
            limits.inlet_pressure_work_min.typical,
            TRADE,
        );
        Some(Pump {
            kind: kind?,
            neutral,
            displacement,
            charge_pressure,
            start_speed: start_speed?,
            work_speed: work_speed?,
            viscosity_start_max: viscosity_start_max?,
            viscosity_work_max: viscosity_work_max?,
            viscosity_min: viscosity_min?,
            viscosity_min_short: viscosity_min_short?,
            inlet_start_min: inlet_start_min?,
            inlet_work_min: inlet_work_min?,
            inlet_work_assumed,
        })
    }

    fn suction(&mut self, policy: &Policy) -> Option<SuctionLine> {
        if self.file.below("suction").next().is_none() {
            return None;
        }
        for key in ["suction.bore", "suction.length"] {
            if self.file.text(key).is_none() {
                self.missing(key);
            }
        }
        let bore = self.given("suction.bore");
        let length = self.given("suction.length");
        let oil_above = self.or_typical("suction.oil_above_pump", 0.0, JUDGEMENT);
        let fittings = self.fittings();
        let strainer = self.strainer();
        if let Some(length) = length {
            self.positive("suction.length", length);
        }
        Some(SuctionLine::new(bore?, length?, oil_above?, &fittings, strainer, &policy.inlet))
    }

    fn fittings(&mut self) -> Vec<(&'static Fitting, u32)> {
        let rows: Vec<(String, String)> = self
            .file
            .below("suction.fittings")
            .map(|(name, entry)| (name, entry.text.clone()))
            .collect();
        let mut fittings = Vec::with_capacity(rows.len());
        for (name, count) in rows {
            let key = format!("suction.fittings.{name}");
            self.note(&key, &count, From::Given);
            let Some(fitting) = Fitting::named(name.trim_matches('"')) else {
                let known: Vec<&str> = Fitting::all().iter().map(Fitting::id).collect();
                let near = known
                    .iter()
                    .map(|id| (strsim::jaro_winkler(&name, id), id))
                    .max_by(|a, b| a.0.total_cmp(&b.0))
                    .filter(|(likeness, _)| *likeness > 0.75);
                let message = match near {
                    Some((_, id)) => format!("unknown fitting; did you mean `{id}`?"),
                    None => format!("unknown fitting; write one of {}", known.join(", ")),
                };
                self.fault(&key, message);
                continue;
            };
            match count.parse::<u32>() {
                Ok(count) if count <= 50 => fittings.push((fitting, count)),
                _ => {
                    self.fault(&key, format!("takes a whole number from 0 to 50, but is `{count}`"))
                }
            }
        }
        fittings
    }

    fn strainer(&mut self) -> Option<Strainer> {
        if self.file.below("suction.strainer").next().is_none() {
            return None;
        }
        for key in ["loss", "at_flow", "at_viscosity"] {
            let key = format!("suction.strainer.{key}");
            if self.file.text(&key).is_none() {
                self.missing(&key);
            }
        }
        let loss = self.given("suction.strainer.loss");
        let at_flow = self.given("suction.strainer.at_flow");
        let at_viscosity = self.viscosity("suction.strainer.at_viscosity");
        let at_density = self.or_typical("suction.strainer.at_density", 860.0, JUDGEMENT);
        let bypass = self.given("suction.strainer.bypass");
        Some(Strainer {
            loss: loss?,
            at_flow: at_flow?,
            at_viscosity: at_viscosity?,
            at_density: at_density?,
            bypass,
        })
    }

    fn case_drain(&mut self) -> Option<CaseDrain> {
        if self.file.below("case_drain").next().is_none() {
            return None;
        }
        for key in ["case_drain.bore", "case_drain.length", "case_drain.flow"] {
            if self.file.text(key).is_none() {
                self.missing(key);
            }
        }
        let bore = self.given("case_drain.bore");
        let length = self.given("case_drain.length");
        let flow = self.given("case_drain.flow");
        let pressure_max = self.given("case_drain.pressure_max");
        if let Some(length) = length {
            self.positive("case_drain.length", length);
        }
        Some(CaseDrain { bore: bore?, length: length?, flow: flow?, pressure_max })
    }

    /// A value that must be over zero although its kind allows less.
    fn positive<Q: Quantity>(&mut self, key: &str, value: Q) {
        if value.value() <= 0.0 {
            self.fault(key, format!("must be more than 0, but is {value}"));
        }
    }

    fn reservoir(&mut self) -> Option<Reservoir> {
        let oil_volume = self.required::<crate::quantity::Volume>("reservoir.oil_volume");
        let v = oil_volume.map_or(0.2, |volume| volume.as_litres() / 1000.0);
        let surface = self.or_typical::<crate::quantity::Area>(
            "reservoir.surface",
            6.9 * v.powf(2.0 / 3.0),
            "a box of usual shape",
        );
        let area = surface.map_or(1.0, crate::quantity::Area::as_m2);
        let steel_mass =
            self.or_typical("reservoir.steel_mass", 31.0 * area, "4 mm plate on its surface");
        let height = self.or_typical("reservoir.height", 0.7 * v.cbrt(), "a box of usual shape");
        let length = self.or_typical("reservoir.length", 1.4 * v.cbrt(), "a box of usual shape");
        let exposure = self
            .word_or("reservoir.exposure", "enclosed", JUDGEMENT)
            .and_then(|word| word.parse().ok());
        let flat_surface = self.or_typical("reservoir.flat_surface", 0.25 * area, JUDGEMENT);
        let thickness = self.given::<crate::quantity::Thickness>("reservoir.insulation.thickness");
        let insulation = match thickness {
            Some(thickness) if thickness.as_mm() > 0.0 => self
                .or_typical(
                    "reservoir.insulation.conductivity",
                    0.040,
                    "mineral wool or foam, common practice",
                )
                .map(|conductivity| (thickness, conductivity)),
            _ => {
                if thickness.is_none()
                    && self.file.text("reservoir.insulation.conductivity").is_some()
                {
                    self.missing("reservoir.insulation.thickness");
                }
                None
            }
        };
        let u_value = self.given("reservoir.u_value");
        let cooldown = self.cooldown();
        let gauge_pressure = self.given("reservoir.gauge_pressure");
        for (key, value) in [("reservoir.height", height), ("reservoir.length", length)] {
            if let Some(value) = value {
                self.positive(key, value);
            }
        }
        Some(Reservoir {
            oil_volume: oil_volume?,
            steel_mass: steel_mass?,
            surface: surface?,
            height: height?,
            length: length?,
            exposure: exposure?,
            flat_surface: flat_surface?,
            insulation,
            u_value,
            cooldown,
            gauge_pressure,
        })
    }

    fn cooldown(&mut self) -> Option<Cooldown> {
        if self.file.below("reservoir.cooldown").next().is_none() {
            return None;
        }
        for key in ["from", "to", "air", "over"] {
            let key = format!("reservoir.cooldown.{key}");
            if self.file.text(&key).is_none() {
                self.missing(&key);
            }
        }
        let from = self.given::<Temperature>("reservoir.cooldown.from");
        let to = self.given::<Temperature>("reservoir.cooldown.to");
        let air = self.given::<Temperature>("reservoir.cooldown.air");
        let over = self.given("reservoir.cooldown.over");
        if let Some(over) = over {
            self.positive::<crate::quantity::TimeSpan>("reservoir.cooldown.over", over);
        }
        let (from, to, air, over) = (from?, to?, air?, over?);
        if !(from > to && to > air) {
            self.fault(
                "reservoir.cooldown.to",
                format!(
                    "must lie between the air ({air}) and the first reading ({from}), but is {to}"
                ),
            );
        }
        Some(Cooldown { from, to, air, over })
    }

    fn circuit(&mut self, reservoir: Option<&Reservoir>) -> Option<Circuit> {
        let tank = reservoir.map_or(200.0, |tank| tank.oil_volume.as_litres());
        let oil_volume = self.or_typical::<crate::quantity::Volume>(
            "circuit.oil_volume",
            1.5 * tank,
            "1.5 times the tank, common practice",
        );
        let litres = oil_volume.map_or(300.0, crate::quantity::Volume::as_litres);
        let least_steel = reservoir.map_or(0.0, |tank| tank.steel_mass.as_kg());
        let steel_mass = self.or_typical(
            "circuit.steel_mass",
            litres.max(least_steel),
            "1 kg per litre of circuit oil, this project's judgement",
        );
        let heat_loss = self.given("circuit.heat_loss");
        if heat_loss.is_none() && self.file.text("circuit.heat_loss").is_none() {
            self.assume(
                "circuit.heat_loss",
                "3 times the tank's".to_owned(),
                "this project's judgement, at the start floor of each oil",
            );
        }
        let standby_pressure = self.given("circuit.standby_pressure");
        Some(Circuit {
            oil_volume: oil_volume?,
            steel_mass: steel_mass?,
            heat_loss,
            standby_pressure,
        })
    }

    fn duty(&mut self) -> Option<Duty> {
        let oil_temperature_max = self.or_typical("duty.oil_temperature_max", 55.0, TRADE);
        let time_to_warm = self.required::<crate::quantity::TimeSpan>("duty.time_to_warm");
        if let Some(time) = time_to_warm {
            self.positive("duty.time_to_warm", time);
        }
        let shift_start = if self.file.text("duty.shift_start").is_some() {
            self.clock("duty.shift_start")
        } else {
            self.assume("duty.shift_start", "06:00".to_owned(), JUDGEMENT);
            "06:00".parse().ok()
        };
        let parked_at = self.clock("duty.parked_at");
        let parked_oil = self.given("duty.parked_oil");
        let credit_parked_heat = self.switch("duty.credit_parked_heat").unwrap_or(false);
        if credit_parked_heat {
            for key in ["duty.parked_at", "duty.parked_oil"] {
                if self.file.text(key).is_none() {
                    self.missing(key);
                }
            }
        }
        let standing = self.or_typical("duty.standing", 12.0, "one night");
        let fluid = match self.word("duty.fluid").as_deref() {
            Some("biodegradable") => FluidKind::Biodegradable,
            _ => FluidKind::Any,
        };
        let prefer = match self.word("duty.prefer").as_deref() {
            Some("heater") => Prefer::Heater,
            _ => Prefer::Oil,
        };
        Some(Duty {
            oil_temperature_max: oil_temperature_max?,
            time_to_warm: time_to_warm?,
            shift_start: shift_start?,
            parked_at,
            parked_oil,
            credit_parked_heat,
            standing: standing?,
            fluid,
            prefer,
        })
    }

    fn supply(&mut self) -> Option<Supply> {
        let voltage = self.given("supply.voltage");
        let current = self.given("supply.current");
        let phases = self.read("supply.phases", |text| match text {
            "1" => Ok(false),
            "3" => Ok(true),
            _ => Err(format!("takes 1 or 3, but is `{text}`")),
        });
        let other_load = self.given("supply.other_load");
        let circuit_keys = ["supply.current", "supply.phases", "supply.other_load"];
        if voltage.is_none() && self.file.text("supply.voltage").is_none() {
            if circuit_keys.iter().any(|key| self.file.text(key).is_some()) {
                self.missing("supply.voltage");
            }
            return None;
        }
        if self.file.text("supply.current").is_none() {
            self.missing("supply.current");
        }
        Some(Supply {
            voltage: voltage?,
            current: current?,
            three_phase: phases.unwrap_or(false),
            other_load: other_load.or_else(|| Power::watts(0.0).ok())?,
        })
    }

    fn heater_sizes(&mut self) -> Vec<Power> {
        let key = "supply.heater_sizes";
        let typical = "250 W; 300 W; 500 W; 750 W; 1000 W; 1500 W; 2000 W; 3000 W";
        let sizes = if self.file.text(key).is_some() {
            self.read(key, powers)
        } else {
            self.assume(key, typical.to_owned(), TRADE);
            powers(typical).ok()
        };
        let mut sizes = sizes.unwrap_or_default();
        sizes.sort_by(|a, b| a.as_watts().total_cmp(&b.as_watts()));
        sizes.dedup();
        sizes
    }

    fn element(&mut self) -> Option<Element> {
        let kind = self.word_or("element.kind", "immersion", TRADE).and_then(|w| w.parse().ok());
        let place =
            self.word_or("element.place", "below-suction", TRADE).and_then(|w| w.parse().ok());
        let diameter = self.or_typical("element.diameter", 10.0, TRADE);
        let power = self.given("element.power");
        let surface = self.given("element.surface");
        let rated_voltage = self.given("element.rated_voltage");
        if surface.is_some() && power.is_none() && self.file.text("element.power").is_none() {
            self.missing("element.power");
        }
        if let Some(power) = power {
            self.positive::<Power>("element.power", power);
        }
        Some(Element {
            kind: kind?,
            place: place?,
            diameter: diameter?,
            power,
            surface,
            rated_voltage,
        })
    }

    fn oils(&mut self, policy: &Policy) -> Vec<Oil> {
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

    fn oil(&mut self, number: usize, policy: &Policy) -> Option<Oil> {
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
        points.append(&mut self.points(&key("cold_viscosity")));
        let viscosity_index = self.number(&key("viscosity_index"));
        let pour_point = self.given(&key("pour_point"));
        let cloud_point = self.given(&key("cloud_point"));
        let biodegradable = self.switch(&key("biodegradable"));
        let data_sheet = !points.is_empty() || viscosity_index.is_some();

        if !data_sheet && self.faults.len() == faults_before {
            return match (class, class_text) {
                (Some(class), _) => self.from_class(
                    number,
                    class,
                    (name, in_service, reference_only.unwrap_or(false)),
                    policy,
                ),
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
        match Oil::from_data(data, &policy.oil) {
            Ok(oil) => Some(oil),
            Err(error) => {
                let at = self.blamed(number, &error);
                self.fault(&at, error.to_string());
                None
            }
        }
    }

    /// The key to point at for what is wrong with an oil.
    fn blamed(&self, number: usize, error: &OilError) -> String {
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
            | OilError::MeasuredBelowPour { at, .. } => point(*at),
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

    /// An oil of a built-in class without a data sheet. What the sheet would say is refused here:
    /// half a data sheet is neither.
    fn from_class(
        &mut self,
        number: usize,
        class: &'static Class,
        (name, in_service, reference_only): (String, bool, bool),
        policy: &Policy,
    ) -> Option<Oil> {
        let oil = Oil::from_class(class, &policy.oil).ok()?;
        self.assume(
            &format!("oil[{number}].viscosity"),
            format!("class {}: middle of the grade, least index, warmest pour point", class.id()),
            class.source(),
        );
        Some(oil.listed(name, in_service, reference_only))
    }

    fn points(&mut self, key: &str) -> Vec<(Temperature, ViscosityReading)> {
        let rows: Vec<(String, String)> =
            self.file.below(key).map(|(at, entry)| (at, entry.text.clone())).collect();
        let mut points = Vec::with_capacity(rows.len());
        for (at, text) in rows {
            let row_key = format!("{key}.{at}");
            self.note(&row_key, &text, From::Given);
            match (at.trim_matches('"').parse::<Temperature>(), text.parse::<ViscosityReading>()) {
                (Ok(at), Ok(reading)) => points.push((at, reading)),
                (Err(error), _) => self.fault(&row_key, format!("as a temperature: {error}")),
                (_, Err(error)) => self.fault(&row_key, error.to_string()),
            }
        }
        points
    }

    fn base(
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

    fn flash(
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

/// A list of powers, `500 W; 1000 W` or `500 W, 1000 W`.
fn powers(text: &str) -> Result<Vec<Power>, String> {
    let separator = if text.contains(';') { ';' } else { ',' };
    let sizes: Vec<Power> = text
        .split(separator)
        .map(str::trim)
        .filter(|size| !size.is_empty())
        .map(|size| size.parse::<Power>().map_err(|error| error.to_string()))
        .collect::<Result<_, _>>()?;
    if sizes.is_empty() || sizes.iter().any(|size| size.as_watts() <= 0.0) {
        return Err(format!("takes a list of heater sizes over 0 W, but is `{text}`"));
    }
    Ok(sizes)
}

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
