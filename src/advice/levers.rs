//! Levers: what would help, each a few keys set over the case, decided anew.
//!
//! Invariant: a lever's figures are those of `decide` on the case with its edits, so that `--set` of
//! them reproduces it.

use super::assess::{Assessment, Verdict};
use super::decide::{Decision, decide};
use super::heating::{HeatingStatus, Tank};
use super::say::{Figure, Fill, Say};
use super::setup::Setup;
use crate::case::{Case, Edit};
use crate::heat::{ElementPlace, Exposure};
use crate::oil::{Class, Oil};
use crate::quantity::shown;

/// One lever.
#[derive(Debug, Clone, PartialEq)]
pub struct Lever {
    /// What it is, by an id.
    pub id: &'static str,
    /// The keys set.
    pub edits: Vec<Edit>,
    /// Which oil of `after` its figures are of.
    pub oil: usize,
    /// The name of that oil.
    pub oil_name: String,
    /// What it does, in words.
    pub text: Say,
    /// The decision with it.
    pub after: Decision,
    /// How much it helps: kelvin of floors and shares of power, for ordering.
    pub gain: f64,
}

impl Lever {
    /// The assessment its figures are of.
    #[must_use]
    pub fn found(&self) -> Option<&Assessment> {
        self.after.oils.get(self.oil)
    }
}

/// Least gain worth showing: K of a floor, and share of the power.
const LEAST_K: f64 = 0.5;
const LEAST_SHARE: f64 = 0.05;
/// What a change of status counts, in kelvin, for ordering.
const STATUS_K: f64 = 20.0;
/// Bores hoses are sold in, mm.
const BORES_MM: [f64; 9] = [12.7, 19.0, 25.4, 31.8, 38.1, 50.8, 63.5, 76.2, 101.6];

/// A change that might help, before it is tried.
struct Try {
    id: &'static str,
    edits: Vec<Edit>,
    /// Its oil where that is a new one.
    oil: Option<usize>,
    text: Say,
}

/// The levers that help, best first.
pub(super) fn levers(case: &Case, decision: &Decision) -> Vec<Lever> {
    let Some(at) = decision.focus() else { return Vec::new() };
    let (Some(oil), Some(found)) = (case.oils.get(at), decision.oils.get(at)) else {
        return Vec::new();
    };
    let mut levers: Vec<Lever> = tries(case, at, oil, found)
        .into_iter()
        .filter_map(|one| {
            let edited = case.with(&one.edits).ok()?;
            let after = decide(&edited);
            let to = one.oil.unwrap_or(at);
            let gain = gain(found, after.oils.get(to)?)?;
            let oil_name = edited.oils.get(to)?.name().to_owned();
            Some(Lever {
                id: one.id,
                edits: one.edits,
                oil: to,
                oil_name,
                text: one.text,
                after,
                gain,
            })
        })
        .collect();
    levers.sort_by(|a, b| b.gain.total_cmp(&a.gain));
    levers
}

/// How much better it is; `None` where it is not worth showing.
fn gain(before: &Assessment, after: &Assessment) -> Option<f64> {
    let floor = |before: Option<f64>, after: Option<f64>| match (before, after) {
        (Some(before), Some(after)) => before - after,
        (None, Some(_)) => STATUS_K,
        (Some(_), None) => -STATUS_K,
        (None, None) => 0.0,
    };
    let start = floor(before.start_floor.at_c, after.start_floor.at_c);
    let light = floor(before.light_floor.at_c, after.light_floor.at_c);
    let work = floor(before.work_floor.at_c, after.work_floor.at_c);
    let (b, a) = (&before.heating, &after.heating);
    let power = match (b.needed_high_w, a.needed_high_w) {
        (Some(before), Some(after)) if before > 0.0 => (before - after) / before,
        (Some(_), None) if a.status == HeatingStatus::NotNeeded => 1.0,
        _ => 0.0,
    };
    // Not needed is good only where the machine starts on its coldest morning too.
    let good = |found: &Assessment| match found.heating.status {
        HeatingStatus::Sized => true,
        HeatingStatus::NotNeeded => found.in_hand_k().is_some_and(|k| k >= 0.0),
        _ => false,
    };
    let status = f64::from(u8::from(good(after))) - f64::from(u8::from(good(before)));
    let grade = |verdict| match verdict {
        Verdict::StartsCold => 4.0,
        Verdict::StartsColdInletUnproven => 3.0,
        Verdict::NeedsHeat => 2.0,
        Verdict::NeedsWholeMachineHeat => 1.0,
        Verdict::NotSuited => 0.0,
    };
    let verdict = grade(after.verdict) - grade(before.verdict);
    if verdict < 0.0 || status < 0.0 {
        return None;
    }
    let worth = start > LEAST_K
        || light > LEAST_K
        || work > LEAST_K
        || power > LEAST_SHARE
        || status > 0.0
        || verdict > 0.0;
    let gain = start + 0.5 * light.max(work) + 10.0 * power + STATUS_K * (status + 0.5 * verdict);
    (worth && gain > 0.0).then_some(gain)
}

fn tries(case: &Case, at: usize, oil: &Oil, found: &Assessment) -> Vec<Try> {
    let mut tries = Vec::new();
    of_oil(case, at, oil, found, &mut tries);
    of_inlet(case, &mut tries);
    of_heat(case, oil, &mut tries);
    of_supply(case, &mut tries);
    tries
}

fn push(
    tries: &mut Vec<Try>,
    id: &'static str,
    edits: &[(&str, &str)],
    template: &str,
    fills: &[(&'static str, Fill)],
) {
    tries.push(Try {
        id,
        edits: edits.iter().map(|(key, value)| Edit::new(key, value)).collect(),
        oil: None,
        text: Say::fill(template, fills),
    });
}

fn of_oil(case: &Case, at: usize, oil: &Oil, found: &Assessment, tries: &mut Vec<Try>) {
    let listed = case.lists_oils() && !oil.class_only();
    let key = |name: &str| format!("oil[{}].{name}", at + 1);
    if listed {
        // Measured where the pump's limit bites, or as near to the soak as there is a number.
        let least = oil.pour_point().map_or(f64::NEG_INFINITY, |pour| {
            pour.as_celsius() + case.policy.oil.no_number_below_k
        });
        let cold = found.soak_c.max(least).ceil();
        if cold < oil.curve().coldest().0 - 3.0 {
            let viscosity = oil.expected(cold);
            push(
                tries,
                "measured-cold-viscosity",
                &[(
                    &key(&format!("cold_viscosity.{} °C", shown(cold))),
                    &format!("{} mm²/s", shown((viscosity * 10.0).round() / 10.0)),
                )],
                "measure the viscosity at {at}: as if it fell on the expected line, at {viscosity}",
                &[
                    ("at", Figure::Temperature(cold).into()),
                    ("viscosity", Figure::Viscosity(viscosity).into()),
                ],
            );
        }
        if let Some(pour) = oil.pour_point().map(|pour| pour.as_celsius()) {
            let cloud = (pour + 3.0).ceil();
            push(
                tries,
                "cloud-point",
                &[(&key("cloud_point"), &format!("{} °C", shown(cloud)))],
                "ask for the cloud point: as if it were {cloud}",
                &[("cloud", Figure::Temperature(cloud).into())],
            );
        }
    }
    if case.lists_oils() {
        if let Some(class) = oil.class().and_then(thinner) {
            let next = case.oils.len() + 1;
            tries.push(Try {
                id: "thinner-class",
                edits: vec![Edit::new(&format!("oil[{next}].class"), class.id())],
                oil: Some(next - 1),
                text: Say::fill(
                    "the next thinner class, {class}, by its class limits",
                    &[("class", class.id().into())],
                ),
            });
        }
    }
}

/// The built-in class of the same letters, one grade thinner.
fn thinner(class: &str) -> Option<&'static Class> {
    let split = |text: &str| -> Option<(String, u32)> {
        let letters: String =
            text.chars().take_while(|c| c.is_alphabetic()).flat_map(char::to_uppercase).collect();
        let digits: String = text
            .chars()
            .skip_while(|c| !c.is_ascii_digit())
            .take_while(char::is_ascii_digit)
            .collect();
        Some((letters, digits.parse().ok()?))
    };
    let (letters, grade) = split(class)?;
    Class::all()
        .iter()
        .filter(|class| !class.reference_only())
        .filter_map(|class| Some((class, split(class.id())?)))
        .filter(|(_, (its, number))| *its == letters && *number < grade)
        .max_by_key(|(_, (_, number))| *number)
        .map(|(class, _)| class)
}

fn of_inlet(case: &Case, tries: &mut Vec<Try>) {
    let speed = case.pump.start_speed.as_rpm();
    let slower = (speed * 0.8 / 10.0).round() * 10.0;
    if slower >= 400.0 {
        push(
            tries,
            "start-speed",
            &[("pump.start_speed", &format!("{} rpm", shown(slower)))],
            "start at {slower} instead of {speed}, where the engine allows it",
            &[("slower", Figure::Speed(slower).into()), ("speed", Figure::Speed(speed).into())],
        );
    }
    if let Some(line) = &case.suction {
        let bore = line.bore_m() * 1000.0;
        if let Some(next) = BORES_MM.iter().find(|size| **size > bore * 1.05) {
            push(
                tries,
                "bigger-bore",
                &[("suction.bore", &format!("{} mm", shown(*next)))],
                "a suction line of {next} bore instead of {bore}",
                &[("next", Figure::Length(*next).into()), ("bore", Figure::Length(bore).into())],
            );
        }
        if line.has_strainer() {
            push(
                tries,
                "without-strainer",
                &[("suction.strainer", "none")],
                "no strainer in the suction line, where the machine's maker allows it",
                &[],
            );
        }
        if case.reservoir.gauge_pressure.is_none_or(|pressure| pressure.as_kpa() < 10.0) {
            push(
                tries,
                "pressurised-tank",
                &[("reservoir.gauge_pressure", "20 kPa")],
                "a tank kept at {pressure} over the air, where it is built for it",
                &[("pressure", Figure::Pressure(20.0).into())],
            );
        }
    }
}

fn of_heat(case: &Case, oil: &Oil, tries: &mut Vec<Try>) {
    let blanket = case.policy.heat.blanket_mm;
    if case.reservoir.insulation.is_none_or(|(thick, _)| thick.as_mm() < blanket) {
        push(
            tries,
            "blanket",
            &[("reservoir.insulation.thickness", &format!("{} mm", shown(blanket)))],
            "{blanket} of insulation round the tank",
            &[("blanket", Figure::Length(blanket).into())],
        );
    }
    if case.reservoir.exposure != Exposure::Enclosed {
        push(
            tries,
            "shelter",
            &[("reservoir.exposure", "enclosed")],
            "the tank behind panels, out of the wind",
            &[],
        );
    } else if case.site.wind.as_m_per_s() > 0.0 {
        push(tries, "shelter", &[("site.wind", "0 m/s")], "parked where no wind reaches it", &[]);
    }
    if case.site.heating > case.site.minimum {
        let text = case.site.minimum.to_string();
        push(
            tries,
            "size-for-the-minimum",
            &[("site.heating_temperature", &text)],
            "a heater sized for the minimum, {minimum}",
            &[("minimum", Figure::Temperature(case.site.minimum.as_celsius()).into())],
        );
    }
    let hours = case.duty.time_to_warm.as_hours();
    let longer = case
        .duty
        .parked_at
        .map(|at| at.hours_until(case.duty.shift_start))
        .filter(|most| *most > hours * 1.05)
        .unwrap_or(2.0 * hours);
    push(
        tries,
        "more-time",
        &[("duty.time_to_warm", &format!("{} h", shown(longer)))],
        "{longer} to warm up instead of {hours}",
        &[
            ("longer", Figure::Time(longer * 3600.0).into()),
            ("hours", Figure::Time(hours * 3600.0).into()),
        ],
    );
    if case.reservoir.cooldown.is_none() && case.reservoir.u_value.is_none() {
        cooldown(case, oil, tries);
    }
    if case.element.place == ElementPlace::AboveSuction {
        push(
            tries,
            "element-below",
            &[("element.place", "below-suction")],
            "the element below the suction",
            &[],
        );
    }
    let most = case.heater_sizes.last().map_or(0.0, |size| size.as_watts());
    if most > 0.0 && most < 6000.0 {
        let sizes: Vec<String> =
            case.heater_sizes.iter().map(|size| format!("{} W", shown(size.as_watts()))).collect();
        let listed = format!("{}; {} W", sizes.join("; "), shown(2.0 * most));
        push(
            tries,
            "larger-heater",
            &[("supply.heater_sizes", &listed)],
            "a heater of {larger} in the supplier's list",
            &[("larger", Figure::Power(2.0 * most).into())],
        );
    }
}

/// Two readings of one night, as if they confirmed the loss as computed.
fn cooldown(case: &Case, oil: &Oil, tries: &mut Vec<Try>) {
    let setup = Setup::new(case, oil);
    let tank = Tank::new(&setup);
    let (from, hours) = (20.0_f64, 8.0);
    if setup.air_c > from - 10.0 {
        return;
    }
    let to = crate::heat::cooled_c(&tank.curve, &tank.capacity, from, hours, 1.0, |_| setup.air_c);
    let text = |celsius: f64| format!("{} °C", shown((celsius * 10.0).round() / 10.0));
    push(
        tries,
        "cool-down-readings",
        &[
            ("reservoir.cooldown.from", &text(from)),
            ("reservoir.cooldown.to", &text(to)),
            ("reservoir.cooldown.air", &text(setup.air_c)),
            ("reservoir.cooldown.over", "8 h"),
        ],
        "two readings of the tank in one night: as if it fell from {from} to {to} in {hours}",
        &[
            ("from", Figure::Temperature(from).into()),
            ("to", Figure::Temperature(to).into()),
            ("hours", Figure::Time(hours * 3600.0).into()),
        ],
    );
}

fn of_supply(case: &Case, tries: &mut Vec<Try>) {
    let Some(supply) = case.supply else { return };
    let amperes = supply.current.as_amperes();
    let ladder: &[f64] = if supply.voltage.as_volts() < 200.0 {
        &[15.0, 20.0, 30.0, 50.0]
    } else {
        &[10.0, 16.0, 20.0, 32.0, 63.0]
    };
    if let Some(next) = ladder.iter().find(|size| **size > amperes) {
        push(
            tries,
            "larger-circuit",
            &[("supply.current", &format!("{} A", shown(*next)))],
            "a circuit of {next} instead of {now}",
            &[("next", Figure::Current(*next).into()), ("now", Figure::Current(amperes).into())],
        );
    }
    if supply.other_load.as_watts() > 0.0 {
        push(
            tries,
            "own-circuit",
            &[("supply.other_load", "0 W")],
            "a circuit of its own, without the other {other}",
            &[("other", Figure::Power(supply.other_load.as_watts()).into())],
        );
    }
}
