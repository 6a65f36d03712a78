//! Single figures against libraries and published equations: `values.json`, made by `values.py`.
//!
//! Each quantity has what it may deviate by, and why by that much.

use coldsump::air::{Air, atmosphere_kpa};
use coldsump::climate::WinterMinimum;
use coldsump::climate::extremes::{self, Winters};
use coldsump::climate::tally::Bins;
use coldsump::heat::{self, HeatCapacity, LossCurve, OilFilm, Rod, TankLoss, Walls, WarmUp};
use coldsump::oil::{self, Bulk, ViscosityCurve, saybolt};
use coldsump::pump::{self, Fitting, Inlet, InletPolicy, Strainer, SuctionLine};
use coldsump::quantity::{Bore, Density, Flow, KinematicViscosity, Length, PressureDifference};
use serde_json::Value;
use std::collections::BTreeMap;

/// How a deviation is counted.
#[derive(Clone, Copy, PartialEq)]
pub(crate) enum Scale {
    /// Difference in K.
    Kelvin,
    /// Share of the figure.
    Share,
    /// Difference of figures that have no unit and may be zero.
    Plain,
}
use Scale::{Kelvin, Plain, Share};

/// A quantity: its name in `values.json`, its name in words, scale, greatest deviation, its reason.
type Row = (&'static str, &'static str, Scale, f64, &'static str);

const ROUNDED: &str = "the same equation, but for rounding and the end of a search";
const INVERSE: &str = "the published inverse of Z is good to 0.03 % from 0.21 mm²/s up";
const REAL_AIR: &str = "air as in the US Standard Atmosphere, not by an equation of state";
const CURVE: &str = "the loss between nodes, and the integral in pieces";

#[rustfmt::skip]
const ROWS: &[Row] = &[
    ("viscosity", "viscosity (D341)", Share, 5e-4, INVERSE),
    ("temperature_at", "temperature of a viscosity (D341)", Kelvin, 1e-6, ROUNDED),
    ("viscosity_index", "viscosity index (D2270)", Plain, 1e-6, ROUNDED),
    ("viscosity_at_100", "100 °C viscosity from the index", Share, 1e-8, ROUNDED),
    ("saybolt_seconds", "Saybolt seconds", Share, 1e-8, ROUNDED),
    ("saybolt_viscosity", "viscosity from Saybolt seconds", Share, 1e-8, ROUNDED),
    ("density", "density", Share, 1e-9, ROUNDED),
    ("expansion", "thermal expansion", Share, 1e-9, ROUNDED),
    ("specific_heat", "specific heat", Share, 1e-4, "the paper's units, converted to five digits"),
    ("conductivity", "thermal conductivity", Share, 1e-4, "the paper's units, converted to five digits"),
    ("atmosphere", "atmosphere", Share, 1e-5, "exponent of five decimals"),
    ("air_density", "air: density", Share, 0.005, "ideal gas"),
    ("air_viscosity", "air: kinematic viscosity", Share, 0.015, REAL_AIR),
    ("air_conductivity", "air: conductivity", Share, 0.03, REAL_AIR),
    ("air_prandtl", "air: Prandtl number", Share, 0.045, "specific heat held at 1006 J/(kg·K), and the conductivity"),
    ("friction", "friction factor (Churchill 1977)", Share, 1e-8, ROUNDED),
    ("fitting_loss", "loss of fittings (Hooper)", Share, 1e-6, "a small difference of two sums"),
    ("inlet_pressure", "inlet pressure", Share, 1e-8, ROUNDED),
    ("largest_viscosity", "largest viscosity at the inlet", Share, 1e-6, ROUNDED),
    ("highest_speed", "highest speed at the inlet, in rpm", Plain, 0.003, "searched to a millionth of the cap"),
    ("case_drain", "case drain", Share, 1e-9, ROUNDED),
    ("hose_fill", "fill of the hose", Share, 1e-9, ROUNDED),
    ("hose_clearing", "clearing of the hose", Share, 1e-7, "the differential equation to 1e-9"),
    ("precharge", "nitrogen precharge", Share, 0.05, "Peng-Robinson against a reference equation of state"),
    ("nusselt_plate", "Nusselt number, plate", Share, 1e-8, ROUNDED),
    ("nusselt_rod", "Nusselt number, rod", Share, 1e-8, ROUNDED),
    ("nusselt_wind", "Nusselt number, wind", Share, 1e-8, ROUNDED),
    ("radiation", "radiation coefficient", Share, 1e-8, ROUNDED),
    ("outside_film", "outside film", Share, 0.015, REAL_AIR),
    ("oil_film", "oil film", Share, 5e-4, INVERSE),
    ("u_value", "U of the tank", Share, 0.015, REAL_AIR),
    ("skin_film", "skin, film properties", Kelvin, 0.05, INVERSE),
    ("skin_bulk", "skin, bulk properties", Kelvin, 0.05, INVERSE),
    ("warm_up", "time to warm", Share, 5e-4, CURVE),
    ("needed_power", "needed power", Share, 1e-4, CURVE),
    ("steady", "steady temperature", Kelvin, 0.01, CURVE),
    ("cooling_time", "time to cool", Share, 1e-4, CURVE),
    ("parked", "tank after a night", Kelvin, 0.2, "steps of ten minutes, for tanks that follow the air within one too"),
    ("cooldown", "loss from two readings", Share, 1e-7, "the differential equation to 1e-11"),
    ("daily_wave", "daily wave in the tank", Share, 1e-9, ROUNDED),
    ("circulation", "time to warm by circulation", Share, 1e-4, "heat capacity at the mean of each piece"),
    ("l_scale", "second L-moment", Kelvin, 1e-9, ROUNDED),
    ("l_skewness", "L-skewness", Plain, 1e-9, ROUNDED),
    ("gev_level", "return level, extreme value distribution", Kelvin, 0.05, "Hosking's approximation to the shape"),
    ("gumbel_l_level", "return level, Gumbel by L-moments", Kelvin, 1e-6, ROUNDED),
    ("level", "return level, Gumbel by moments", Kelvin, 1e-6, ROUNDED),
    ("chance", "chance in a winter", Plain, 1e-9, ROUNDED),
    ("risk", "chance in many winters", Plain, 1e-9, ROUNDED),
    ("trend", "trend in a decade", Kelvin, 1e-6, ROUNDED),
    ("mean_of_levels", "mean from return levels", Kelvin, 1e-6, ROUNDED),
    ("percentile", "percentile", Kelvin, 1e-9, ROUNDED),
];

/// One value's arguments.
struct Inputs<'a>(&'a Value);

impl Inputs<'_> {
    fn get(&self, key: &str) -> f64 {
        self.0[key].as_f64().unwrap_or_else(|| panic!("no {key} in {}", self.0))
    }

    fn text(&self, key: &str) -> &str {
        self.0[key].as_str().unwrap()
    }

    fn list(&self, key: &str) -> Vec<f64> {
        self.0[key].as_array().unwrap().iter().map(|item| item.as_f64().unwrap()).collect()
    }

    fn bulk(&self) -> Bulk {
        Bulk::from_density_15(Density::kg_per_m3(self.get("density_15")).unwrap())
    }

    fn curve(&self) -> ViscosityCurve {
        ViscosityCurve::through(&[(40.0, self.get("kv40")), (100.0, self.get("kv100"))]).unwrap()
    }

    /// m³/s.
    fn flow(&self) -> f64 {
        self.get("flow") / 60_000.0
    }

    /// Pa·s.
    fn mu(&self) -> f64 {
        self.get("nu") * 1e-6 * self.get("density")
    }

    fn inlet(&self) -> Inlet {
        let kpa = |key| PressureDifference::kpa(self.get(key)).unwrap();
        let fitting = Fitting::named(self.text("fitting")).unwrap();
        let strainer = Strainer {
            loss: kpa("strainer"),
            at_flow: Flow::litres_per_min(100.0).unwrap(),
            at_viscosity: KinematicViscosity::mm2_per_s(32.0).unwrap(),
            at_density: Density::kg_per_m3(860.0).unwrap(),
            bypass: Some(kpa("bypass")),
        };
        let line = SuctionLine::new(
            Bore::mm(self.get("bore")).unwrap(),
            Length::m(self.get("length")).unwrap(),
            Length::m(self.get("head")).unwrap(),
            &[(fitting, self.get("count") as u32)],
            Some(strainer),
            &InletPolicy::default(),
        );
        Inlet::new(line, self.get("tank"))
    }

    /// What one fitting adds to the loss, over the velocity head.
    fn fitting_loss(&self) -> f64 {
        let (bore, re) = (self.get("bore"), self.get("re"));
        let fitting = Fitting::named(self.text("fitting")).unwrap();
        let at = |fittings: &[(&Fitting, u32)]| {
            let metre = Length::m(1.0).unwrap();
            let bore = Bore::mm(bore).unwrap();
            let line =
                SuctionLine::new(bore, metre, metre, fittings, None, &InletPolicy::default());
            // 1 m/s: the velocity head is half the density.
            let q = line.area_m2();
            let nu = line.bore_m() / re * 1e6;
            Inlet::new(line, 100.0).balance(q, nu, 2000.0).fittings
        };
        at(&[(fitting, 1)]) - at(&[])
    }

    /// `ask` of the tank's loss curve up to a temperature, with its heat capacity.
    fn tank(
        &self,
        top_c: f64,
        ask: impl Fn(&LossCurve, &HeatCapacity) -> Option<f64>,
    ) -> Option<f64> {
        let (curve, bulk) = (self.curve(), self.bulk());
        let oil = OilFilm { curve: &curve, bulk: &bulk };
        let area = self.get("surface");
        let loss = TankLoss::from_films(self.walls(), oil, 0.9, area, self.get("ambient"));
        let capacity = HeatCapacity::new(self.get("litres"), &bulk, self.get("steel"), 440.0);
        ask(&LossCurve::new(&loss, top_c), &capacity)
    }

    fn walls(&self) -> Walls {
        Walls {
            height: self.get("height"),
            length: self.get("length"),
            wind: self.get("wind"),
            insulation: self.get("insulation"),
            emissivity: 0.9,
        }
    }

    fn winters(&self) -> Winters {
        let minima = self.list("minima").into_iter().zip(1951..);
        let minima = minima.map(|(celsius, ends)| WinterMinimum { ends, celsius }).collect();
        Winters::new(minima).unwrap()
    }
}

/// The figure as the library has it; `None` where it has none.
fn here(quantity: &str, of: &Inputs<'_>) -> Option<f64> {
    let at = || of.get("at");
    let air = || Air::at(of.get("at"));
    Some(match quantity {
        "viscosity" => {
            let points = [(of.get("cold"), of.get("cold_nu")), (of.get("warm"), of.get("warm_nu"))];
            ViscosityCurve::through(&points).unwrap().at(at())
        }
        "temperature_at" => of.curve().lines().next().unwrap().temperature_at(of.get("nu")),
        "viscosity_index" => oil::viscosity_index(of.get("kv40"), of.get("kv100"))?,
        "viscosity_at_100" => oil::viscosity_at_100(of.get("kv40"), of.get("index"))?,
        "saybolt_seconds" => saybolt::seconds(of.get("nu"), of.get("fahrenheit")),
        "saybolt_viscosity" => saybolt::viscosity(of.get("seconds"), of.get("fahrenheit"))?,
        "density" => of.bulk().density(at()),
        "expansion" => of.bulk().expansion(at()),
        "specific_heat" => of.bulk().specific_heat(at()),
        "conductivity" => of.bulk().conductivity(at()),
        "atmosphere" => atmosphere_kpa(of.get("elevation")),
        "air_density" => air().density,
        "air_viscosity" => air().kinematic_viscosity,
        "air_conductivity" => air().conductivity,
        "air_prandtl" => air().prandtl,
        "friction" => pump::friction_factor(of.get("re"), of.get("roughness")),
        "fitting_loss" => of.fitting_loss(),
        "inlet_pressure" => of.inlet().pressure_kpa(of.flow(), of.get("nu"), of.get("density")),
        "largest_viscosity" => {
            of.inlet().largest_viscosity(of.flow(), of.get("density"), of.get("least"))?
        }
        "highest_speed" => {
            let per_rpm = of.get("displacement") * 1e-6 / 60.0;
            let (nu, rho) = (of.get("nu"), of.get("density"));
            of.inlet().highest_speed(per_rpm, nu, rho, of.get("least"), 3000.0)?
        }
        "case_drain" => {
            pump::case_drain_kpa(of.mu(), of.get("length"), of.get("bore") / 1e3, of.flow())
        }
        "hose_fill" | "hose_clearing" => {
            let (length, bore, dp) = (of.get("length"), of.get("bore") / 1e3, of.get("dp") * 1e3);
            if quantity == "hose_clearing" {
                return Some(pump::clearing_time(of.mu(), length, dp, bore));
            }
            let velocity = of.flow() / (std::f64::consts::FRAC_PI_4 * bore * bore);
            pump::initial_fill(of.mu(), length, dp, bore, velocity)
        }
        "precharge" => pump::precharge_kpa(of.get("pressure"), at(), of.get("to"))?,
        "nusselt_plate" => heat::nusselt_plate(of.get("ra"), of.get("pr")),
        "nusselt_rod" => heat::nusselt_rod(of.get("ra"), of.get("pr")),
        "nusselt_wind" => heat::nusselt_wind(of.get("re"), of.get("pr")),
        "radiation" => heat::radiation(of.get("emissivity"), of.get("surface"), of.get("ambient")),
        "outside_film" => heat::outside(
            of.get("surface"),
            of.get("ambient"),
            of.get("wind"),
            of.get("height"),
            of.get("length"),
            of.get("emissivity"),
        ),
        "oil_film" | "u_value" | "skin_film" | "skin_bulk" => {
            let (curve, bulk, oil_c) = (of.curve(), of.bulk(), of.get("oil_at"));
            let oil = OilFilm { curve: &curve, bulk: &bulk };
            let rod = || Rod { oil, diameter: of.get("diameter") / 1e3 };
            match quantity {
                "oil_film" => oil.wall(oil_c, of.get("wall"), of.get("height")),
                "u_value" => TankLoss::from_films(of.walls(), oil, 0.9, 1.0, of.get("ambient"))
                    .u_value(oil_c),
                "skin_film" => rod().skin_film(of.get("density"), oil_c)?,
                _ => rod().skin_bulk(of.get("density"), oil_c)?,
            }
        }
        "warm_up" | "needed_power" => {
            let (start, end) = (of.get("start"), of.get("start") + of.get("rise"));
            of.tank(end, |curve, capacity| {
                let way = WarmUp::new(curve, capacity, start, end, 1.0);
                if quantity == "warm_up" {
                    way.time_s(of.get("power"))
                } else {
                    Some(way.needed_power_w(of.get("hours") * 3600.0))
                }
            })?
        }
        "steady" => of.tank(100.0, |curve, _| curve.steady_c(of.get("power"), 1.0))?,
        "cooling_time" => {
            let (start, ambient) = (of.get("start"), of.get("ambient"));
            let end = ambient + of.get("share") * (start - ambient);
            of.tank(start, |curve, capacity| {
                heat::cooling_time_s(curve, capacity, start, end, 1.0)
            })?
        }
        "parked" => {
            let loss = TankLoss::from_cooldown(of.get("ua"), 1.0, -60.0);
            let capacity = HeatCapacity::new(of.get("litres"), &of.bulk(), 0.0, 440.0);
            let night = of.list("night");
            let air = heat::hourly(&night).unwrap();
            let curve = LossCurve::new(&loss, 100.0);
            heat::parked_c(&curve, &capacity, of.get("parked"), of.get("hours"), 1.0, air)
        }
        "cooldown" => {
            let (start, ambient) = (of.get("start"), of.get("ambient"));
            let end = ambient + of.get("share") * (start - ambient);
            heat::cooldown_ua(of.get("capacity"), start, end, ambient, of.get("over"))
        }
        "daily_wave" => heat::daily_wave(of.get("hours")).0,
        "circulation" => {
            let (start, end) = (of.get("start"), of.get("start") + of.get("rise"));
            let capacity = HeatCapacity::new(of.get("litres"), &of.bulk(), 0.0, 440.0);
            let (power, loss, ambient) = (of.get("power"), of.get("loss"), of.get("ambient"));
            heat::circulation_time_s(&capacity, power, loss, ambient, start, end)?
        }
        "l_scale" => of.winters().l_moments().1,
        "l_skewness" => of.winters().l_moments().2,
        "gev_level" => of.winters().gev_level(of.get("once_in")),
        "gumbel_l_level" => of.winters().gumbel_l_level(of.get("once_in")),
        "level" => of.winters().level(of.get("once_in")).celsius,
        "chance" => extremes::chance(of.get("mean"), of.get("deviation"), at()),
        "risk" => extremes::risk(of.get("once_in"), of.get("winters")),
        "trend" => of.winters().trend_k_per_decade(),
        "mean_of_levels" => {
            let levels = of.0["levels"].as_array().unwrap().iter();
            let levels = levels.map(|row| (row[0].as_f64().unwrap(), row[1].as_f64().unwrap()));
            extremes::from_levels(&levels.collect::<Vec<_>>())?.0
        }
        "percentile" => {
            let mut bins = Bins::default();
            assert!(of.list("readings").into_iter().all(|reading| bins.add(reading)));
            bins.percentile(of.get("share"))?
        }
        other => panic!("values.json has {other}, which nothing here computes"),
    })
}

/// A row of the table of deviations.
pub(crate) struct Deviations {
    pub(crate) what: &'static str,
    pub(crate) against: String,
    pub(crate) scale: Scale,
    /// Every deviation, in no order.
    pub(crate) each: Vec<f64>,
}

impl Deviations {
    /// Median and worst.
    fn spread(&self) -> (f64, f64) {
        let mut each = self.each.clone();
        each.sort_by(f64::total_cmp);
        (each[each.len() / 2], each[each.len() - 1])
    }

    /// The row as Markdown. Under `1e-9` there is only rounding, which differs between machines.
    pub(crate) fn row(&self) -> String {
        let shown = |value: f64| match self.scale {
            _ if value < 1e-9 => "rounding".to_owned(),
            Kelvin if value < 1e-4 => "under 0.0001 K".to_owned(),
            Kelvin => format!("{} K", two_digits(value)),
            Share | Plain if value < 1e-6 => "under 0.0001 %".to_owned(),
            Share => format!("{} %", two_digits(value * 100.0)),
            Plain => two_digits(value),
        };
        let (median, worst) = self.spread();
        let Self { what, against, each, .. } = self;
        format!("| {what} | {} | {against} | {} | {} |\n", each.len(), shown(median), shown(worst))
    }
}

/// Two digits that count, without an exponent.
fn two_digits(value: f64) -> String {
    let digits = (1.0 - value.log10().floor()).clamp(0.0, 12.0) as usize;
    format!("{value:.digits$}")
}

/// All quantities compared.
pub(crate) struct Compared {
    /// In the order of the table.
    pub(crate) rows: Vec<Deviations>,
    /// What is over its tolerance.
    pub(crate) wrong: Vec<String>,
    /// Seed and versions of the stored values.
    pub(crate) made: String,
}

impl Compared {
    pub(crate) fn count(&self) -> usize {
        self.rows.iter().map(|row| row.each.len()).sum()
    }
}

/// Compares every stored value.
pub(crate) fn compare() -> Compared {
    let stored: Value =
        serde_json::from_str(&std::fs::read_to_string("tests/reference/values.json").unwrap())
            .unwrap();
    let versions = stored["versions"].as_object().unwrap().iter();
    let versions = versions.map(|(name, version)| format!("{name} {}", version.as_str().unwrap()));
    let made = format!("seed {}; {}", stored["seed"], versions.collect::<Vec<_>>().join(", "));
    println!("{made}");
    let mut by_quantity: BTreeMap<&str, Vec<&Value>> = BTreeMap::new();
    for value in stored["values"].as_array().unwrap() {
        by_quantity.entry(value["quantity"].as_str().unwrap()).or_default().push(value);
    }
    let mut wrong = Vec::new();
    let mut rows = Vec::new();
    for &(quantity, what, scale, allowed, why) in ROWS {
        let values = by_quantity.remove(quantity).unwrap_or_else(|| panic!("no {quantity} stored"));
        let mut each = Vec::new();
        for value in &values {
            let inputs = &value["inputs"];
            let found = here(quantity, &Inputs(inputs)).unwrap_or(f64::NAN);
            let want = value["value"].as_f64().unwrap();
            let apart = (found - want).abs() / if scale == Share { want.abs() } else { 1.0 };
            // Written so that what is not a number is wrong too.
            let close = apart <= allowed;
            if !close {
                wrong.push(format!(
                    "{quantity}: {found} here, {want} there, {apart:.1e} apart, allowed \
                     {allowed:.1e} ({why}): {inputs}"
                ));
            }
            each.push(apart);
        }
        let against = values[0]["library"].as_str().unwrap();
        let against = if against == "published" { "the published equation" } else { against };
        rows.push(Deviations { what, against: against.to_owned(), scale, each });
    }
    assert!(by_quantity.is_empty(), "stored but not compared: {:?}", by_quantity.keys());
    Compared { rows, wrong, made }
}
