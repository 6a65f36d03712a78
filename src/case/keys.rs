//! The one table of case keys: path, kind, need, example, question, where to find it.
//!
//! Reading, `--set`, messages and the key list of the README come from here. The `policy` keys are
//! rows of the policy table and are listed with these by [`all`].

use super::policy;
use crate::quantity::{self, Kind, Quantity};

/// What kind of value a key takes.
#[derive(Debug, Clone, Copy)]
pub enum KeyKind {
    /// Free text.
    Text,
    /// `true` or `false`.
    Switch,
    /// A whole number.
    Whole,
    /// A plain number from the first to the second.
    Number(f64, f64),
    /// One of a few words.
    Choice(&'static [&'static str]),
    /// A quantity with a unit.
    Quantity(&'static Kind),
    /// A viscosity: kinematic, or Saybolt Universal seconds.
    Viscosity,
    /// A temperature, or which minimum of the site's climate it is.
    Minimum,
    /// A time of day, `06:00`.
    Clock,
    /// A list of powers.
    Powers,
    /// A table from temperature to viscosity.
    ViscosityTable,
    /// A table from fitting to how many there are.
    FittingTable,
}

/// What happens where a key is not given.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Need {
    /// The case is refused.
    Required,
    /// A typical value is used and listed as an assumption.
    Typical,
    /// What needs it is not checked, or does not apply.
    Optional,
}

/// One key of the case file.
#[derive(Debug, Clone, Copy)]
pub struct Key {
    /// Dotted path; keys of an oil are written `oil.KEY`.
    pub path: &'static str,
    /// What it takes.
    pub kind: KeyKind,
    /// What happens without it.
    pub need: Need,
    /// An example, as it stands in a case file.
    pub example: &'static str,
    /// The question a person is asked.
    pub question: &'static str,
    /// Where the figure is found.
    pub find: &'static str,
}

impl Key {
    /// The words the key's value is given in, for messages: `a temperature`, `true or false`.
    #[must_use]
    pub fn takes(&self) -> String {
        match self.kind {
            KeyKind::Text => "text in quotes".to_owned(),
            KeyKind::Switch => "true or false".to_owned(),
            KeyKind::Whole => "a whole number".to_owned(),
            KeyKind::Number(least, greatest) => {
                format!("a number from {} to {}", quantity::shown(least), quantity::shown(greatest))
            }
            KeyKind::Choice(words) => format!("one of {}", words.join(", ")),
            KeyKind::Quantity(kind) => format!("a {} in quotes", kind.noun),
            KeyKind::Viscosity => "a viscosity in quotes".to_owned(),
            KeyKind::Minimum => "a temperature in quotes".to_owned(),
            KeyKind::Clock => "a time of day in quotes".to_owned(),
            KeyKind::Powers => "a list of powers".to_owned(),
            KeyKind::ViscosityTable => "a table of temperature = viscosity".to_owned(),
            KeyKind::FittingTable => "a table of fitting = how many".to_owned(),
        }
    }
}

const fn of<Q: Quantity>() -> KeyKind {
    KeyKind::Quantity(Q::KIND)
}

macro_rules! keys {
    ($($path:literal, $kind:expr, $need:ident, $example:literal, $question:literal, $find:literal;)*) => {
        &[$(Key {
            path: $path,
            kind: $kind,
            need: Need::$need,
            example: $example,
            question: $question,
            find: $find,
        }),*]
    };
}

use KeyKind::{
    Choice, Clock, FittingTable, Minimum, Number, Powers, Switch, Text, Viscosity, ViscosityTable,
    Whole,
};
use quantity::{
    AbsolutePressure, Area, Bore, Current, Density, Displacement, Elevation, Flow, GaugePressure,
    HeatLossRate, HeatTransferCoefficient, Length, Mass, Power, PressureDifference, Rotation,
    Temperature, ThermalConductivity, Thickness, TimeSpan, Velocity, Voltage, Volume,
};

/// Pump kinds as written in a case.
const PUMP_KINDS: &[&str] = &[
    "external-gear",
    "internal-gear",
    "vane",
    "axial-piston",
    "bent-axis",
    "radial-piston",
    "gerotor",
];
const BASES: &[&str] =
    &["mineral", "polymer-thickened", "pao", "ester", "natural-ester", "glycol", "other"];

/// The keys without `policy`.
pub static KEYS: &[Key] = keys! {
    "format", Whole, Required, "1", "Format of this file", "always 1";
    "title", Text, Optional, "\"Loader 12, Skarn Ridge quarry\"", "What should this case be called?", "machine number and site";
    "units", Choice(&["metric", "us"]), Optional, "\"metric\"", "Show results in metric or US units?", "your choice";

    "site.climate", Text, Optional, "\"skarn-ridge\"", "Which site or climate class is it?", "a climate file, or a design class C0 to C4";
    "site.minimum_temperature", Minimum, Required, "\"-38 °C\"", "Coldest temperature the machine must be started at?", "weather records of the site, in a valley colder than the airport";
    "site.heating_temperature", Minimum, Typical, "\"-34 °C\"", "Air temperature the heater is sized for?", "weather records; the minimum itself where nothing else is known";
    "site.wind", of::<Velocity>(), Typical, "\"3 m/s\"", "Wind at that temperature?", "weather records of cold mornings";
    "site.elevation", of::<Elevation>(), Typical, "\"640 m\"", "Height above sea level?", "map or survey";
    "site.clear_sky", Switch, Optional, "false", "Does it stand open under a clear night sky?", "where it is parked";

    "machine.engine", Choice(&["diesel", "petrol", "electric"]), Optional, "\"diesel\"", "What drives the pump?", "machine plate";
    "machine.intake_heater", Switch, Optional, "true", "Has the engine glow plugs or an intake heater?", "engine manual";
    "machine.hose_rating", of::<Temperature>(), Optional, "\"-40 °C\"", "Lowest temperature the hoses are rated for?", "printed on the hose, or its standard";
    "machine.pump_heated", Switch, Optional, "false", "Is the pump itself heated?", "look for a pad or a heated loop on the pump";
    "machine.accumulator.precharge", of::<GaugePressure>(), Optional, "\"30 bar\"", "Accumulator precharge?", "accumulator plate or service sheet";
    "machine.accumulator.at", of::<Temperature>(), Optional, "\"20 °C\"", "At which gas temperature was it set?", "service sheet";

    "pump.kind", Choice(PUMP_KINDS), Required, "\"axial-piston\"", "Which kind of pump draws from the tank?", "pump plate or parts list";
    "pump.neutral", Choice(&["open-centre", "load-sensing", "closed-loop"]), Optional, "\"load-sensing\"", "What does the oil do with all levers in neutral?", "hydraulic diagram";
    "pump.displacement", of::<Displacement>(), Optional, "\"75 cm³\"", "Displacement of all that draws through the suction line?", "pump plate; for a closed loop the charge pump";
    "pump.charge_pressure", of::<GaugePressure>(), Optional, "\"25 bar\"", "Charge pressure of the closed loop?", "machine manual";
    "pump.start_speed", of::<Rotation>(), Typical, "\"1000 rpm\"", "Pump speed right after the engine fires, cold?", "tachometer at cold idle, times any gear ratio";
    "pump.work_speed", of::<Rotation>(), Typical, "\"2100 rpm\"", "Pump speed at work?", "machine manual";
    "pump.viscosity_start_max", Viscosity, Typical, "\"1600 mm²/s\"", "Thickest oil the pump may be started with?", "pump data: start-up viscosity, no load, short";
    "pump.viscosity_work_max", Viscosity, Typical, "\"400 mm²/s\"", "Thickest oil the pump may work with?", "pump data: viscosity range under load";
    "pump.viscosity_min", Viscosity, Typical, "\"10 mm²/s\"", "Thinnest oil the pump may run with for long?", "pump data";
    "pump.viscosity_min_short", Viscosity, Typical, "\"7 mm²/s\"", "Thinnest oil for a short time?", "pump data";
    "pump.inlet_pressure_start_min", of::<AbsolutePressure>(), Typical, "\"60 kPa\"", "Lowest absolute inlet pressure at a cold start?", "pump data; a vacuum is given as `12 inHg vacuum`";
    "pump.inlet_pressure_work_min", of::<AbsolutePressure>(), Typical, "\"80 kPa\"", "Lowest absolute inlet pressure at work?", "pump data";

    "suction.bore", of::<Bore>(), Optional, "\"50.8 mm\"", "Inside diameter of the suction hose?", "printed on the hose; outside diameter less twice the wall";
    "suction.length", of::<Length>(), Optional, "\"1.5 m\"", "Length of the suction line?", "tape measure along the hose, tank to pump";
    "suction.oil_above_pump", of::<Length>(), Typical, "\"0.5 m\"", "Height of the oil level above the pump inlet?", "tape measure; negative where the pump sits above the oil";
    "suction.fittings", FittingTable, Optional, "{ \"elbow-90-long\" = 2, \"butterfly\" = 1 }", "Elbows, tees and valves in the suction line?", "follow the hose by hand";
    "suction.strainer.loss", of::<PressureDifference>(), Optional, "\"2.5 kPa\"", "Pressure loss of the suction strainer?", "strainer data, clean";
    "suction.strainer.at_flow", of::<Flow>(), Optional, "\"150 L/min\"", "At which flow?", "strainer data";
    "suction.strainer.at_viscosity", Viscosity, Optional, "\"32 mm²/s\"", "At which viscosity?", "strainer data";
    "suction.strainer.at_density", of::<Density>(), Typical, "\"860 kg/m³\"", "At which density?", "strainer data";
    "suction.strainer.bypass", of::<PressureDifference>(), Optional, "\"20 kPa\"", "Pressure at which its bypass opens?", "strainer data";

    "case_drain.bore", of::<Bore>(), Optional, "\"16 mm\"", "Inside diameter of the case drain line?", "printed on the hose";
    "case_drain.length", of::<Length>(), Optional, "\"2 m\"", "Length of the case drain line?", "tape measure";
    "case_drain.flow", of::<Flow>(), Optional, "\"4 L/min\"", "Case drain flow?", "pump data";
    "case_drain.pressure_max", of::<GaugePressure>(), Optional, "\"300 kPa\"", "Highest case pressure allowed when cold?", "pump data";

    "reservoir.oil_volume", of::<Volume>(), Required, "\"200 L\"", "Oil in the tank?", "machine manual, or the tank measured inside";
    "reservoir.steel_mass", of::<Mass>(), Typical, "\"40 kg\"", "Mass of the tank's steel?", "drawing, or area times wall";
    "reservoir.surface", of::<Area>(), Typical, "\"2.36 m²\"", "Outside surface of the tank?", "tape measure, all six faces";
    "reservoir.height", of::<Length>(), Typical, "\"0.42 m\"", "Height wetted by oil?", "dipstick or sight glass";
    "reservoir.length", of::<Length>(), Typical, "\"0.8 m\"", "Length of the tank along the wind?", "tape measure";
    "reservoir.exposure", Choice(&["enclosed", "open-frame", "exposed"]), Typical, "\"enclosed\"", "How does the tank stand in the wind?", "behind panels, in an open frame, or in the open";
    "reservoir.flat_surface", of::<Area>(), Typical, "\"0.6 m²\"", "Flat outside area a heating pad can be stuck on?", "tape measure";
    "reservoir.insulation.thickness", of::<Thickness>(), Optional, "\"25 mm\"", "Insulation on the tank?", "look";
    "reservoir.insulation.conductivity", of::<ThermalConductivity>(), Typical, "\"0.040 W/(m·K)\"", "Conductivity of the insulation?", "insulation data";
    "reservoir.u_value", of::<HeatTransferCoefficient>(), Optional, "\"7 W/(m²·K)\"", "Known heat loss per area of the tank?", "a test or the maker's figure; cool-down readings are better";
    "reservoir.cooldown.from", of::<Temperature>(), Optional, "\"20 °C\"", "Cool-down readings: oil temperature at first?", "two readings in one night, machine off";
    "reservoir.cooldown.to", of::<Temperature>(), Optional, "\"-5 °C\"", "Cool-down readings: oil temperature later?", "two readings in one night, machine off";
    "reservoir.cooldown.air", of::<Temperature>(), Optional, "\"-25 °C\"", "Cool-down readings: air temperature?", "mean of the night";
    "reservoir.cooldown.over", of::<TimeSpan>(), Optional, "\"8 h\"", "Cool-down readings: time between them?", "clock";
    "reservoir.gauge_pressure", of::<GaugePressure>(), Optional, "\"0 kPa\"", "Air pressure kept in the tank at a cold start?", "regulator; a breathing or cap-sealed tank has none when cold";

    "circuit.oil_volume", of::<Volume>(), Typical, "\"300 L\"", "Oil in the whole circuit, tank included?", "machine manual";
    "circuit.steel_mass", of::<Mass>(), Typical, "\"250 kg\"", "Steel that warms with the oil, tank included?", "estimate: pump, valves, lines, cylinders";
    "circuit.heat_loss", of::<HeatLossRate>(), Typical, "\"40 W/K\"", "Heat loss of the whole circuit?", "a cool-down with the machine idling, or an estimate";
    "circuit.standby_pressure", of::<GaugePressure>(), Optional, "\"25 bar\"", "Pump pressure with all levers in neutral?", "gauge at the pump, or the hydraulic diagram";

    "duty.oil_temperature_max", of::<Temperature>(), Typical, "\"55 °C\"", "Hottest oil temperature in the season this fill is for?", "machine display on a hard day";
    "duty.time_to_warm", of::<TimeSpan>(), Required, "\"4 h\"", "Hours the heater may take?", "time between plugging in and shift start";
    "duty.shift_start", Clock, Typical, "\"06:00\"", "When does the shift start?", "site plan";
    "duty.parked_at", Clock, Optional, "\"18:00\"", "When is the machine parked?", "site plan";
    "duty.parked_oil", of::<Temperature>(), Optional, "\"50 °C\"", "Oil temperature when parked?", "machine display";
    "duty.credit_parked_heat", Switch, Optional, "false", "Count on the warmth left from the day?", "only where it is parked warm every evening";
    "duty.standing", of::<TimeSpan>(), Typical, "\"12 h\"", "How long does it stand between shifts at the most?", "site plan; think of weekends";
    "duty.fluid", Choice(&["any", "biodegradable"]), Optional, "\"any\"", "Must the oil be biodegradable?", "site permit";
    "duty.prefer", Choice(&["oil", "heater"]), Optional, "\"oil\"", "Rather change the oil or fit a heater?", "your choice";

    "supply.voltage", of::<Voltage>(), Optional, "\"230 V\"", "Supply voltage?", "outlet or panel";
    "supply.current", of::<Current>(), Optional, "\"16 A\"", "Rating of the circuit's breaker?", "panel";
    "supply.phases", Whole, Optional, "1", "One phase or three?", "outlet or panel";
    "supply.other_load", of::<Power>(), Optional, "\"0 W\"", "What else is on the same circuit?", "engine block heater, battery charger on the same cord";
    "supply.tariff", Number(0.0, 1000.0), Optional, "0.30", "Price of a kWh, in your currency?", "electricity bill";
    "supply.heater_sizes", Powers, Typical, "[\"500 W\", \"1000 W\", \"1500 W\"]", "Heater sizes to be had?", "supplier's list";

    "element.kind", Choice(&["immersion", "pad"]), Typical, "\"immersion\"", "Heater in the oil, or a pad on the outside?", "your choice";
    "element.place", Choice(&["below-suction", "above-suction", "circulated"]), Typical, "\"below-suction\"", "Where does the element sit?", "look: against the suction pick-up";
    "element.diameter", of::<Bore>(), Typical, "\"10 mm\"", "Diameter of the heating rod?", "calliper or heater data";
    "element.power", of::<Power>(), Optional, "\"1500 W\"", "Power of the element already fitted?", "stamped on the element";
    "element.surface", of::<Area>(), Optional, "\"2400 cm²\"", "Heated surface of the element fitted?", "heater data: diameter times length times 3.14";
    "element.rated_voltage", of::<Voltage>(), Optional, "\"230 V\"", "Voltage the element is rated at?", "stamped on the element";

    "oil.name", Text, Optional, "\"oil in service\"", "What do you call this oil?", "your choice";
    "oil.in_service", Switch, Optional, "true", "Is it in the machine now?", "service record";
    "oil.base", Choice(BASES), Typical, "\"mineral\"", "What is the oil made from?", "data sheet: mineral, with viscosity improver, PAO, ester ...";
    "oil.class", Text, Optional, "\"HM 46\"", "Class of the oil?", "drum label: HM, HV, HEES ... and ISO VG";
    "oil.viscosity", ViscosityTable, Optional, "{ \"40 °C\" = \"46 mm²/s\", \"100 °C\" = \"6.8 mm²/s\" }", "Viscosities on the data sheet?", "data sheet: 40 and 100 °C";
    "oil.viscosity_index", Number(-100.0, 500.0), Optional, "101", "Viscosity index?", "data sheet; instead of the 100 °C viscosity";
    "oil.cold_viscosity", ViscosityTable, Optional, "{ \"-20 °C\" = \"4100 mPa·s\" }", "Any viscosity measured in the cold?", "data sheet or laboratory, ASTM D2983 or D445: the figure that helps most";
    "oil.density", of::<Density>(), Typical, "\"875 kg/m³\"", "Density at 15 °C?", "data sheet";
    "oil.pour_point", of::<Temperature>(), Optional, "\"-24 °C\"", "Pour point?", "data sheet, ASTM D97 or ISO 3016";
    "oil.cloud_point", of::<Temperature>(), Optional, "\"-12 °C\"", "Cloud point?", "data sheet or laboratory, ASTM D2500";
    "oil.flash_point", of::<Temperature>(), Typical, "\"220 °C\"", "Flash point?", "data sheet";
    "oil.biodegradable", Switch, Optional, "false", "Is it certified biodegradable?", "data sheet or certificate";
    "oil.reference_only", Switch, Optional, "false", "Only compare it, never choose it?", "your choice";
};

/// Every key there is, the policy keys last.
pub fn all() -> impl Iterator<Item = Key> {
    KEYS.iter().copied().chain(policy::ROWS.iter().map(policy::PolicyRow::key))
}

/// The key of a path; `oil[2].name` is looked up as `oil.name`.
#[must_use]
pub fn find(path: &str) -> Option<Key> {
    let path = without_index(path);
    all().find(|key| key.path == path)
}

/// The table key (viscosities, fittings) a longer path lies in, with what follows it.
#[must_use]
pub fn table_of(path: &str) -> Option<(Key, String)> {
    let path = without_index(path);
    all()
        .filter(|key| matches!(key.kind, KeyKind::ViscosityTable | KeyKind::FittingTable))
        .find_map(|key| {
            let rest = path.strip_prefix(key.path)?.strip_prefix('.')?;
            Some((key, rest.to_owned()))
        })
}

/// `true` if some key lies under this path, which then must be a table.
#[must_use]
pub fn is_section(path: &str) -> bool {
    let path = without_index(path);
    all().any(|key| key.path.strip_prefix(path.as_str()).is_some_and(|rest| rest.starts_with('.')))
}

/// The known key nearest to a mistyped one, if any is near.
#[must_use]
pub fn nearest(path: &str) -> Option<&'static str> {
    let path = without_index(path);
    let (section, last) = path.rsplit_once('.').unwrap_or(("", &path));
    let distance = |key: &str| {
        let (key_section, key_last) = key.rsplit_once('.').unwrap_or(("", key));
        // A right word in a wrong section is nearer than a wrong word in the right section.
        let word = 1.0 - strsim::jaro_winkler(last, key_last);
        let place = if section == key_section {
            0.0
        } else {
            0.1 + 0.1 * (1.0 - strsim::jaro_winkler(section, key_section))
        };
        word + place
    };
    all()
        .map(|key| (distance(key.path), key.path))
        .min_by(|a, b| a.0.total_cmp(&b.0))
        .filter(|(distance, _)| *distance < 0.25)
        .map(|(_, path)| path)
}

fn without_index(path: &str) -> String {
    match (path.find('['), path.find(']')) {
        (Some(open), Some(close)) if open < close => {
            let (head, tail) = (path.get(..open), path.get(close + 1..));
            format!("{}{}", head.unwrap_or_default(), tail.unwrap_or_default())
        }
        _ => path.to_owned(),
    }
}
