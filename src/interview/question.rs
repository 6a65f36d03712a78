//! The questions as data, over the one table of case keys.

use super::draft::Draft;

/// A part of the interview.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
#[allow(missing_docs, reason = "`title` says what each is")]
pub enum Section {
    Start,
    Site,
    Machine,
    Pump,
    Suction,
    Reservoir,
    Duty,
    Oils,
    Supply,
}

impl Section {
    /// All, in order.
    pub const ALL: &'static [Self] = &[
        Self::Start,
        Self::Site,
        Self::Machine,
        Self::Pump,
        Self::Suction,
        Self::Reservoir,
        Self::Duty,
        Self::Oils,
        Self::Supply,
    ];

    /// Its name on screen.
    #[must_use]
    pub const fn title(self) -> &'static str {
        match self {
            Self::Start => "Start",
            Self::Site => "Site",
            Self::Machine => "Machine",
            Self::Pump => "Pump",
            Self::Suction => "Suction line",
            Self::Reservoir => "Reservoir and circuit",
            Self::Duty => "Duty",
            Self::Oils => "Oils",
            Self::Supply => "Supply and element",
        }
    }

    /// Why it is asked.
    #[must_use]
    pub const fn why(self) -> &'static str {
        match self {
            Self::Start => "How the figures are shown.",
            Self::Site => "How cold it gets decides everything that follows.",
            Self::Machine => "These only sharpen the cautions.",
            Self::Pump => "The pump's limits are what the oil is judged against.",
            Self::Suction => {
                "Thick oil starves a pump through its suction line: this proves that it fills."
            }
            Self::Reservoir => "Litres and steel are what a heater has to warm.",
            Self::Duty => "When it must run, and how hot it gets.",
            Self::Oils => "The oil in the machine, and others to compare.",
            Self::Supply => "The heater must fit the circuit it is plugged into.",
        }
    }

    /// What follows from skipping it; `None` where it cannot be skipped.
    #[must_use]
    pub const fn skipped(self) -> Option<&'static str> {
        match self {
            Self::Start | Self::Site | Self::Pump | Self::Reservoir | Self::Duty => None,
            Self::Machine => Some("cautions are shown for every engine"),
            Self::Suction => {
                Some("the inlet is not checked: no oil will read plainly `starts cold`")
            }
            Self::Oils => Some("the built-in classes are compared"),
            Self::Supply => Some("the heater is sized without a circuit"),
        }
    }
}

/// One question.
#[derive(Debug)]
pub struct Question {
    /// The id of its answer: a case key, or one of its own.
    pub id: &'static str,
    /// Its section.
    pub section: Section,
    /// Asked in the short interview too.
    pub quick: bool,
    /// The words, where they are not those of the key table.
    pub text: Option<&'static str>,
    /// Where it is found, where the key table does not say it.
    pub help: Option<&'static str>,
    /// An example in US units.
    pub us: Option<&'static str>,
    /// Choices of its own: (answer, words).
    pub choices: &'static [(&'static str, &'static str)],
    /// Whether it is asked, by the answers so far.
    pub when: fn(&Draft, bool) -> bool,
}

const fn of(id: &'static str, section: Section) -> Question {
    Question {
        id,
        section,
        quick: false,
        text: None,
        help: None,
        us: None,
        choices: &[],
        when: |_, _| true,
    }
}

impl Question {
    const fn quick(mut self) -> Self {
        self.quick = true;
        self
    }

    const fn us(mut self, example: &'static str) -> Self {
        self.us = Some(example);
        self
    }

    const fn asked(mut self, text: &'static str, help: &'static str) -> Self {
        self.text = Some(text);
        self.help = Some(help);
        self
    }

    const fn choices(mut self, choices: &'static [(&'static str, &'static str)]) -> Self {
        self.choices = choices;
        self
    }

    const fn when(mut self, when: fn(&Draft, bool) -> bool) -> Self {
        self.when = when;
        self
    }
}

fn is(draft: &Draft, id: &str, text: &str) -> bool {
    draft.get(id) == Some(text)
}

/// Answered, and not with "I don't know".
fn known(draft: &Draft, id: &str) -> bool {
    draft.get(id).is_some_and(|text| !matches!(text, "?" | "none" | ""))
}

/// All questions but those of the oils, which are put for each oil.
pub static QUESTIONS: &[Question] = &[
    of("units", Section::Start).quick().choices(&[
        ("metric", "metric: °C, mm²/s, kPa, litres"),
        ("us", "US: °F, SUS, psi, gallons"),
    ]),
    of("title", Section::Start).when(|_, quick| !quick),
    of("site.climate", Section::Site).when(|_, quick| !quick),
    of("site.minimum_temperature", Section::Site).quick().us("-36 °F"),
    of("site.heating_temperature", Section::Site).us("-30 °F"),
    of("site.wind", Section::Site).us("7 mph"),
    of("site.elevation", Section::Site).quick().us("2100 ft"),
    of("site.clear_sky", Section::Site),
    of("machine.engine", Section::Machine),
    of("machine.intake_heater", Section::Machine).when(|d, _| !is(d, "machine.engine", "electric")),
    of("machine.hose_rating", Section::Machine).us("-40 °F"),
    of("machine.pump_heated", Section::Machine),
    of("machine.accumulator.precharge", Section::Machine).us("435 psi"),
    of("machine.accumulator.at", Section::Machine)
        .us("68 °F")
        .when(|d, _| known(d, "machine.accumulator.precharge")),
    of("pump.kind", Section::Pump).quick(),
    of("pump.neutral", Section::Pump).quick(),
    of("pump.displacement", Section::Pump).quick().us("4.6 in³"),
    of("pump.rated_flow", Section::Pump)
        .asked(
            "Rated flow at a speed, instead?",
            "pump plate or machine manual; type for example `150 L/min at 2000 rpm`",
        )
        .us("40 gpm at 2000 rpm")
        .when(|d, _| d.get("pump.displacement").is_some() && !known(d, "pump.displacement")),
    of("pump.charge_pressure", Section::Pump)
        .us("360 psi")
        .when(|d, _| is(d, "pump.neutral", "closed-loop")),
    of("pump.start_speed", Section::Pump),
    of("pump.work_speed", Section::Pump),
    of("pump.viscosity_start_max", Section::Pump).us("7500 SUS"),
    of("pump.viscosity_work_max", Section::Pump).us("1900 SUS"),
    of("pump.viscosity_min", Section::Pump).us("60 SUS"),
    of("pump.viscosity_min_short", Section::Pump).us("49 SUS"),
    of("pump.inlet_pressure_start_min", Section::Pump).us("12 inHg vacuum"),
    of("pump.inlet_pressure_work_min", Section::Pump).us("6 inHg vacuum"),
    of("suction.bore", Section::Suction).us("2 in").when(|_, quick| !quick),
    of("hose.outside", Section::Suction)
        .quick()
        .asked(
            "Outside diameter of the suction hose?",
            "calliper, or tape measure round it divided by 3.14; the bore follows from a table of hoses",
        )
        .us("2.4 in")
        .when(|d, quick| quick || !known(d, "suction.bore")),
    of("suction.length", Section::Suction)
        .quick()
        .us("5 ft")
        .when(|d, _| known(d, "suction.bore") || known(d, "hose.outside")),
    of("suction.oil_above_pump", Section::Suction)
        .us("1.6 ft")
        .when(|d, _| known(d, "suction.length")),
    of("hose.bends", Section::Suction)
        .quick()
        .asked("How does the hose run?", "follow it by hand from the tank to the pump")
        .choices(&[
            ("straight", "straight"),
            ("one", "one bend"),
            ("two", "two bends"),
            ("three", "three bends"),
        ])
        .when(|d, _| known(d, "suction.length")),
    of("hose.valve", Section::Suction)
        .asked("Is there a shut-off valve in it?", "look near the tank")
        .choices(&[("none", "none"), ("butterfly", "butterfly"), ("ball", "ball"), ("gate", "gate")])
        .when(|d, _| known(d, "suction.length")),
    of("hose.strainer", Section::Suction)
        .asked("Is there a suction strainer in the tank?", "parts list, or look through the filler")
        .choices(&[
            ("no", "no"),
            ("clean", "yes, changed this season"),
            ("old", "yes, older"),
            ("?", "I don't know: counted as an older one"),
        ])
        .when(|d, _| known(d, "suction.length")),
    of("suction.strainer.loss", Section::Suction).us("0.36 psi").when(strainer),
    of("suction.strainer.at_flow", Section::Suction).us("40 gpm").when(strainer_known),
    of("suction.strainer.at_viscosity", Section::Suction).us("150 SUS").when(strainer_known),
    of("suction.strainer.at_density", Section::Suction).us("54 lb/ft³").when(strainer_known),
    of("suction.strainer.bypass", Section::Suction).us("3 psi").when(strainer_known),
    of("case_drain.bore", Section::Suction).us("0.63 in"),
    of("case_drain.length", Section::Suction).us("6.5 ft").when(|d, _| known(d, "case_drain.bore")),
    of("case_drain.flow", Section::Suction).us("1 gpm").when(|d, _| known(d, "case_drain.length")),
    of("case_drain.pressure_max", Section::Suction)
        .us("43 psi")
        .when(|d, _| known(d, "case_drain.flow")),
    of("reservoir.oil_volume", Section::Reservoir).quick().us("50 gal"),
    of("reservoir.steel_mass", Section::Reservoir).us("90 lb"),
    of("reservoir.surface", Section::Reservoir).us("25 ft²"),
    of("reservoir.height", Section::Reservoir).us("17 in"),
    of("reservoir.length", Section::Reservoir).us("32 in"),
    of("reservoir.exposure", Section::Reservoir).quick(),
    of("reservoir.flat_surface", Section::Reservoir).us("6.5 ft²"),
    of("reservoir.insulation.thickness", Section::Reservoir).us("1 in"),
    of("reservoir.insulation.conductivity", Section::Reservoir)
        .when(|d, _| known(d, "reservoir.insulation.thickness")),
    of("reservoir.u_value", Section::Reservoir),
    of("reservoir.cooldown.from", Section::Reservoir).us("68 °F"),
    of("reservoir.cooldown.to", Section::Reservoir)
        .us("23 °F")
        .when(|d, _| known(d, "reservoir.cooldown.from")),
    of("reservoir.cooldown.air", Section::Reservoir)
        .us("-13 °F")
        .when(|d, _| known(d, "reservoir.cooldown.to")),
    of("reservoir.cooldown.over", Section::Reservoir)
        .when(|d, _| known(d, "reservoir.cooldown.air")),
    of("reservoir.gauge_pressure", Section::Reservoir).us("0 psi"),
    of("circuit.oil_volume", Section::Reservoir).us("80 gal"),
    of("circuit.steel_mass", Section::Reservoir).us("550 lb"),
    of("circuit.heat_loss", Section::Reservoir),
    of("circuit.standby_pressure", Section::Reservoir).us("360 psi"),
    of("duty.oil_temperature_max", Section::Duty).us("130 °F"),
    of("duty.time_to_warm", Section::Duty).quick(),
    of("duty.shift_start", Section::Duty).quick(),
    of("duty.parked_at", Section::Duty),
    of("duty.parked_oil", Section::Duty).us("120 °F"),
    of("duty.credit_parked_heat", Section::Duty)
        .when(|d, _| known(d, "duty.parked_at") && known(d, "duty.parked_oil")),
    of("duty.standing", Section::Duty),
    of("duty.fluid", Section::Duty),
    of("duty.prefer", Section::Duty),
    of("supply.voltage", Section::Supply).quick().us("120 V"),
    of("supply.current", Section::Supply)
        .quick()
        .us("15 A")
        .when(|d, _| known(d, "supply.voltage")),
    of("supply.phases", Section::Supply).when(|d, _| known(d, "supply.voltage")),
    of("supply.other_load", Section::Supply).when(|d, _| known(d, "supply.voltage")),
    of("supply.tariff", Section::Supply),
    of("supply.heater_sizes", Section::Supply),
    of("element.kind", Section::Supply),
    of("element.place", Section::Supply),
    of("element.diameter", Section::Supply).us("0.4 in"),
    of("element.power", Section::Supply),
    of("element.surface", Section::Supply)
        .us("370 in²")
        .when(|d, _| known(d, "element.power")),
    of("element.rated_voltage", Section::Supply).when(|d, _| known(d, "element.power")),
];

fn strainer(draft: &Draft, _: bool) -> bool {
    known(draft, "suction.length")
        && matches!(draft.get("hose.strainer"), Some("clean" | "old" | "?"))
}

fn strainer_known(draft: &Draft, quick: bool) -> bool {
    strainer(draft, quick) && known(draft, "suction.strainer.loss")
}

/// The questions of one oil; ids are `oil1.NAME`.
pub(super) static OIL_QUESTIONS: &[Question] = &[
    of("how", Section::Oils)
        .quick()
        .asked("How is the oil known?", "the data sheet is best; the drum label is enough to begin")
        .choices(&[
            ("sheet", "by its data sheet"),
            ("class", "by its class on the label, HM 46 for example"),
            ("mixture", "a mixture nobody knows"),
            ("none", "not at all: compare the built-in classes"),
        ]),
    of("class", Section::Oils)
        .quick()
        .when(|d, quick| is(d, "how", "class") || (is(d, "how", "sheet") && !quick)),
    of("mixture", Section::Oils)
        .quick()
        .asked(
            "Thickest grade that may be in the mixture?",
            "ISO VG of the oils topped up; it is counted as the next thicker HM with a pour point of -15 °C, and the jar test decides",
        )
        .choices(&[("22", "VG 22"), ("32", "VG 32"), ("46", "VG 46"), ("?", "I don't know: VG 46")])
        .when(|d, _| is(d, "how", "mixture")),
    of("name", Section::Oils).when(|d, quick| !quick && !is(d, "how", "none")),
    of("viscosity.40 °C", Section::Oils)
        .quick()
        .asked("Viscosity at 40 °C?", "data sheet; for SUS at 100 °F type `none` and go on")
        .us("46 mm²/s")
        .when(|d, _| is(d, "how", "sheet")),
    of("viscosity.100 °C", Section::Oils)
        .quick()
        .asked("Viscosity at 100 °C?", "data sheet; type `none` where only the index is given")
        .us("6.8 mm²/s")
        .when(|d, _| is(d, "how", "sheet") && known(d, "viscosity.40 °C")),
    of("viscosity_index", Section::Oils)
        .quick()
        .when(|d, _| known(d, "viscosity.40 °C") && is(d, "viscosity.100 °C", "none")),
    of("viscosity.100 °F", Section::Oils)
        .quick()
        .asked("Viscosity at 100 °F?", "data sheet, SUS")
        .us("215 SUS")
        .when(|d, _| is(d, "viscosity.40 °C", "none")),
    of("viscosity.210 °F", Section::Oils)
        .quick()
        .asked("Viscosity at 210 °F?", "data sheet, SUS")
        .us("48 SUS")
        .when(|d, _| is(d, "viscosity.40 °C", "none")),
    of("cold_viscosity", Section::Oils)
        .quick()
        .asked(
            "Any viscosity measured in the cold? It is the one figure that helps most",
            "data sheet or laboratory (ASTM D2983, D445); type for example `-20 °C = 4100 mPa·s`, or `none`",
        )
        .us("-4 °F = 4100 mPa·s")
        .when(|d, _| is(d, "how", "sheet")),
    of("pour_point", Section::Oils)
        .quick()
        .us("-30 °F")
        .when(|d, _| matches!(d.get("how"), Some("sheet" | "class"))),
    of("base", Section::Oils).when(|d, quick| !quick && is(d, "how", "sheet")),
    of("density", Section::Oils)
        .us("55 lb/ft³")
        .when(|d, quick| !quick && matches!(d.get("how"), Some("sheet" | "class"))),
    of("cloud_point", Section::Oils)
        .us("10 °F")
        .when(|d, quick| !quick && matches!(d.get("how"), Some("sheet" | "class"))),
    of("flash_point", Section::Oils)
        .us("400 °F")
        .when(|d, quick| !quick && matches!(d.get("how"), Some("sheet" | "class"))),
    of("biodegradable", Section::Oils)
        .when(|d, quick| !quick && matches!(d.get("how"), Some("sheet" | "class"))),
    of("reference_only", Section::Oils).when(|d, quick| !quick && !is(d, "how", "none")),
    of("in_service", Section::Oils).when(|d, quick| !quick && !is(d, "how", "none")),
    of("more", Section::Oils)
        .asked("Another oil to compare?", "a winter grade or a synthetic, up to six in all")
        .choices(&[("no", "no"), ("yes", "yes")])
        .when(|d, _| !is(d, "how", "none")),
];

/// Keys that questions of their own stand for: fittings, and the measured cold viscosity.
#[cfg(test)]
pub(super) const STOOD_FOR: &[&str] =
    &["suction.fittings", "oil.viscosity", "oil.cold_viscosity", "format"];

#[cfg(test)]
mod tests {
    use super::{OIL_QUESTIONS, QUESTIONS, STOOD_FOR};
    use crate::case::keys::{self, KEYS};

    #[test]
    fn every_key_is_asked_for_and_every_question_is_one() {
        for key in KEYS {
            let asked = match key.path.strip_prefix("oil.") {
                Some(name) => OIL_QUESTIONS.iter().any(|q| q.id == name),
                None => QUESTIONS.iter().any(|q| q.id == key.path),
            };
            assert!(asked || STOOD_FOR.contains(&key.path), "{} is never asked", key.path);
        }
        for question in QUESTIONS {
            let own = question.text.is_some();
            assert!(own || keys::find(question.id).is_some(), "{} is no key", question.id);
        }
        for question in OIL_QUESTIONS {
            let own = question.text.is_some();
            assert!(
                own || keys::find(&format!("oil.{}", question.id)).is_some(),
                "{}",
                question.id
            );
        }
        let quick = QUESTIONS.iter().filter(|q| q.quick).count();
        assert!((10..=18).contains(&quick), "{quick} short questions");
    }
}
