//! Everything of a case but its oils: site, machine, pump, lines, tank, duty, supply, element.

use super::super::model::{
    CaseDrain, Circuit, Cooldown, Duty, Element, FluidKind, From, Machine, MinimumHow, Prefer,
    Pump, Reservoir, Site, Supply,
};
use super::super::policy::{self, Policy};
use super::desk::Desk;
use super::{JUDGEMENT, TRADE};
use crate::climate::{self, Wish};
use crate::pump::{Fitting, Neutral, PumpKind, Strainer, SuctionLine};
use crate::quantity::{
    AbsolutePressure, Area, Power, Quantity, Temperature, Thickness, TimeSpan, Volume, shown,
};

impl Desk<'_> {
    pub(super) fn format(&mut self) {
        match self.file.text("format") {
            None => self.missing("format"),
            Some("1") => {}
            Some(other) => {
                let message = format!("this program reads format 1, but the file says {other}");
                self.fault("format", message);
            }
        }
    }

    pub(super) fn policy(&mut self) -> Policy {
        let mut policy = Policy::default();
        for row in policy::ROWS {
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

    pub(super) fn site(&mut self) -> Option<Site> {
        let climate = self.climate();
        let minimum = self.minimum(climate.as_ref());
        let heating = self.heating(climate.as_ref(), minimum.as_ref());
        let wind = self.out_of_climate("site.wind", climate.as_ref(), |climate| {
            let wind = climate.wind.as_ref()?;
            let cold = heating.as_ref().is_some_and(|(heating, _)| {
                climate
                    .minima
                    .percent_99
                    .as_ref()
                    .is_some_and(|p| heating.as_celsius() >= p.celsius)
            });
            Some(if cold { wind.at_99_m_s } else { wind.deep_cold_m_s })
        });
        let wind = wind.or_else(|| self.or_typical("site.wind", 2.0, JUDGEMENT));
        let elevation =
            self.out_of_climate("site.elevation", climate.as_ref(), |climate| climate.elevation_m);
        let elevation = elevation.or_else(|| self.or_typical("site.elevation", 0.0, "sea level"));
        let clear_sky = self.switch("site.clear_sky").unwrap_or(false);
        let minimum_wish = match self.file.text("site.minimum_temperature") {
            Some(text) => Wish::read(text).ok().flatten(),
            None => climate.as_ref().and_then(climate::Site::usual_minimum).map(|(wish, _)| wish),
        };
        let (minimum, minimum_how) = minimum?;
        let (heating, heating_how) = heating?;
        Some(Site {
            climate,
            minimum,
            minimum_how,
            minimum_wish,
            heating,
            heating_how,
            wind: wind?,
            elevation: elevation?,
            clear_sky,
        })
    }

    /// The climate a case names.
    fn climate(&mut self) -> Option<climate::Site> {
        let name = self.text("site.climate")?;
        match self.sites.site(&name) {
            // What a case calls it is what it is looked up by again.
            Ok(Some(site)) => Some(climate::Site { name, ..site }),
            Ok(None) => {
                let known: Vec<&str> =
                    climate::BuiltIn::all().iter().map(|site| site.name.as_str()).collect();
                let message = format!(
                    "no climate `{name}` is known; name a climate file, or one of {}",
                    known.join(", ")
                );
                self.fault("site.climate", message);
                None
            }
            Err(message) => {
                self.fault("site.climate", message);
                None
            }
        }
    }

    /// A figure the climate holds, where the case does not give it.
    fn out_of_climate<Q: Quantity>(
        &mut self,
        key: &str,
        climate: Option<&climate::Site>,
        of: impl Fn(&climate::Site) -> Option<f64>,
    ) -> Option<Q> {
        if self.file.text(key).is_some() {
            return self.given(key);
        }
        let value = Q::of(of(climate?)?).ok()?;
        self.note(key, &value.to_string(), From::Climate);
        Some(value)
    }

    /// The coldest the machine must start at.
    fn minimum(&mut self, climate: Option<&climate::Site>) -> Option<(Temperature, MinimumHow)> {
        let key = "site.minimum_temperature";
        if self.file.text(key).is_some() {
            return self.wished(key, climate);
        }
        if self.file.text("site.climate").is_none() {
            self.missing(key);
            return None;
        }
        // A climate that is not known has its own fault.
        let climate = climate?;
        let Some((wish, found)) = climate.usual_minimum() else {
            self.fault("site.climate", format!("`{}` holds no minimum", climate.name));
            return None;
        };
        let value = Temperature::of(found.celsius).ok()?;
        self.assume(key, format!("{wish}: {value}"), &found.words);
        Some((value, MinimumHow::of(found.how)))
    }

    /// What the heater is sized for.
    fn heating(
        &mut self,
        climate: Option<&climate::Site>,
        minimum: Option<&(Temperature, MinimumHow)>,
    ) -> Option<(Temperature, MinimumHow)> {
        let key = "site.heating_temperature";
        if self.file.text(key).is_some() {
            return self.wished(key, climate);
        }
        let (minimum, how) = *minimum?;
        let percent = climate.and_then(|site| site.temperature(Wish::Percent(99.6)).ok());
        if let Some(found) = percent.filter(|found| found.celsius >= minimum.as_celsius()) {
            let value = Temperature::of(found.celsius).ok()?;
            self.assume(key, format!("99.6 %: {value}"), &found.words);
            return Some((value, MinimumHow::Percentile));
        }
        self.assume(key, minimum.to_string(), "the minimum itself");
        let how = if how == MinimumHow::Given { MinimumHow::AsMinimum } else { how };
        Some((minimum, how))
    }

    /// A site temperature: a figure, or which of the climate's.
    fn wished(
        &mut self,
        key: &str,
        climate: Option<&climate::Site>,
    ) -> Option<(Temperature, MinimumHow)> {
        let unknown = climate.is_none() && self.file.text("site.climate").is_some();
        self.read(key, |text| {
            let Some(wish) = Wish::read(text)? else {
                return text
                    .parse::<Temperature>()
                    .map(|value| Some((value, MinimumHow::Given)))
                    .map_err(|error| error.to_string());
            };
            let Some(climate) = climate else {
                // Where a climate is named that is not known, that is the fault.
                return if unknown {
                    Ok(None)
                } else {
                    Err(format!(
                        "`{text}` needs a climate with records (site.climate); or write the figure, for example `-38 °C`"
                    ))
                };
            };
            let found = climate.temperature(wish)?;
            let value = Temperature::of(found.celsius).map_err(|error| error.to_string())?;
            Ok(Some((value, MinimumHow::of(found.how))))
        })?
    }

    pub(super) fn machine(&mut self) -> Machine {
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

    pub(super) fn pump(&mut self) -> Option<Pump> {
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

    pub(super) fn suction(&mut self, policy: &Policy) -> Option<SuctionLine> {
        self.file.below("suction").next()?;
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

    /// The start limit where the inlet cannot be checked: what a usual suction line passes at this
    /// elevation (this project's judgement), so that the answer stays on the safe side.
    pub(super) fn unproven_start_max(&mut self, site: &Site, pump: &Pump, policy: &Policy) -> f64 {
        let policy = &policy.limits;
        let usual = match pump.kind {
            PumpKind::ExternalGear | PumpKind::InternalGear | PumpKind::Gerotor => {
                policy.unproven_viscosity_gear_mm2_s
            }
            _ => policy.unproven_viscosity_mm2_s,
        };
        let air = crate::air::atmosphere_kpa(site.elevation.as_m());
        let passes = usual * (air - pump.inlet_start_min.as_kpa()) / policy.unproven_drop_kpa;
        let most = pump.viscosity_start_max.as_mm2_per_s();
        let value = if passes < most {
            format!(
                "not checked; a start with at most {} mm²/s instead of the pump's {}",
                shown(passes.max(0.0)),
                pump.viscosity_start_max
            )
        } else {
            "not checked; the pump's own start limit is the tighter".to_owned()
        };
        let key = if self.file.below("suction").next().is_none() {
            "suction"
        } else {
            "pump.displacement"
        };
        self.assume(key, value, "what a usual suction line passes, this project's judgement");
        if let Some(last) = self.assumptions.last_mut() {
            last.ask = "outside diameter and length of the suction hose, and the displacement on the pump plate".to_owned();
        }
        passes.min(most)
    }

    pub(super) fn fittings(&mut self) -> Vec<(&'static Fitting, u32)> {
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
                    self.fault(
                        &key,
                        format!("takes a whole number from 0 to 50, but is `{count}`"),
                    );
                }
            }
        }
        fittings
    }

    pub(super) fn strainer(&mut self) -> Option<Strainer> {
        self.file.below("suction.strainer").next()?;
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

    pub(super) fn case_drain(&mut self) -> Option<CaseDrain> {
        self.file.below("case_drain").next()?;
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
    pub(super) fn positive<Q: Quantity>(&mut self, key: &str, value: Q) {
        if value.value() <= 0.0 {
            self.fault(key, format!("must be more than 0, but is {value}"));
        }
    }

    pub(super) fn reservoir(&mut self) -> Option<Reservoir> {
        let oil_volume = self.required::<Volume>("reservoir.oil_volume");
        let v = oil_volume.map_or(0.2, |volume| volume.as_litres() / 1000.0);
        let surface = self.or_typical::<Area>(
            "reservoir.surface",
            6.9 * v.powf(2.0 / 3.0),
            "a box of usual shape",
        );
        let area = surface.map_or(1.0, Area::as_m2);
        let steel_mass =
            self.or_typical("reservoir.steel_mass", 31.0 * area, "4 mm plate on its surface");
        let height = self.or_typical("reservoir.height", 0.7 * v.cbrt(), "a box of usual shape");
        let length = self.or_typical("reservoir.length", 1.4 * v.cbrt(), "a box of usual shape");
        let exposure = self
            .word_or("reservoir.exposure", "enclosed", JUDGEMENT)
            .and_then(|word| word.parse().ok());
        let flat_surface = self.or_typical("reservoir.flat_surface", 0.25 * area, JUDGEMENT);
        let thickness = self.given::<Thickness>("reservoir.insulation.thickness");
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

    pub(super) fn cooldown(&mut self) -> Option<Cooldown> {
        self.file.below("reservoir.cooldown").next()?;
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
            self.positive::<TimeSpan>("reservoir.cooldown.over", over);
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

    pub(super) fn circuit(&mut self, reservoir: Option<&Reservoir>) -> Option<Circuit> {
        let tank = reservoir.map_or(200.0, |tank| tank.oil_volume.as_litres());
        let oil_volume = self.or_typical::<Volume>(
            "circuit.oil_volume",
            1.5 * tank,
            "1.5 times the tank, common practice",
        );
        let litres = oil_volume.map_or(300.0, Volume::as_litres);
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

    pub(super) fn duty(&mut self) -> Option<Duty> {
        let oil_temperature_max = self.or_typical("duty.oil_temperature_max", 55.0, TRADE);
        let time_to_warm = self.required::<TimeSpan>("duty.time_to_warm");
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

    pub(super) fn supply(&mut self) -> Option<Supply> {
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

    pub(super) fn heater_sizes(&mut self) -> Vec<Power> {
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

    pub(super) fn element(&mut self) -> Option<Element> {
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
}

/// A list of powers, `500 W; 1000 W` or `500 W, 1000 W`.
fn powers(text: &str) -> Result<Vec<Power>, String> {
    // As typed, or as a file has it: `["500 W", "1000 W"]`.
    let text = text.trim().trim_start_matches('[').trim_end_matches(']').replace('"', "");
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
