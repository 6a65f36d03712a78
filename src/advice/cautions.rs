//! Cautions: texts and sources in one table of data, a trigger for each here.
//!
//! Invariants: every row has a trigger and every trigger a row (a test holds them together); the
//! statement that defers to manual, codes and trades is always among them.

use super::decide::DEEP_COLD_C;
use super::plan::PlanKind;
use super::procedure::Scene;
use super::say::Figure::{Difference, Power, Temperature};
use super::say::{Fill, Say};
use crate::oil::{Base, Reach};
use crate::pump::Neutral;
use crate::source::Read;
use crate::words::words;
use serde::Deserialize;
use std::sync::LazyLock;

words! {
    /// The signal word, by severity: ANSI Z535.4.
    Signal: "signal word" {
        Danger = "DANGER",
        Warning = "WARNING",
        Caution = "CAUTION",
        Notice = "NOTICE",
    }
}

/// A caution as it stands in the table.
#[derive(Debug, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct CautionRow {
    /// Its id.
    pub id: String,
    /// A few words for the card.
    pub short: String,
    signal: String,
    /// A stop: nothing is started until it is settled.
    #[serde(default)]
    pub stop: bool,
    /// The text.
    pub text: String,
    /// Where it is published.
    pub source: String,
    /// How that was read.
    pub read: Read,
}

impl CautionRow {
    /// The signal word.
    #[must_use]
    pub fn signal(&self) -> Signal {
        self.signal.parse().unwrap_or(Signal::Danger)
    }
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Table {
    caution: Vec<CautionRow>,
}

/// Empty only if the embedded table were damaged, which a test rules out.
static TABLE: LazyLock<Vec<CautionRow>> = LazyLock::new(|| {
    toml::from_str::<Table>(include_str!("cautions.toml"))
        .map(|table| table.caution)
        .unwrap_or_default()
});

/// A caution that applies, and why it does.
#[derive(Debug, Clone, PartialEq)]
pub struct Caution {
    /// Its row.
    pub row: &'static CautionRow,
    /// Why it is shown.
    pub because: Say,
}

impl PartialEq for CautionRow {
    fn eq(&self, other: &Self) -> bool {
        self.id == other.id
    }
}

/// Whether a caution applies; the words why.
pub(super) struct Trigger {
    id: &'static str,
    find: fn(&Scene<'_>) -> Option<Say>,
}

/// Oil with a flash point under this is treated with care at a heater, °C: UFGS 14240 asks for at
/// least 190 °C of an indoor heated tank, ordinary hydraulic oils have over 150 °C.
const LOW_FLASH_C: f64 = 150.0;
/// Seals of ordinary nitrile rubber end near here, °C; handbook level, memory.
const STIFF_SEALS_C: f64 = -30.0;
/// Fibre slings end here, °C: WAC 296-78-755(2).
const LIFTING_C: f64 = -29.0;
/// Extreme cold begins here, °C: TM 5-3810-294-10, 2-23.
const EXTREME_C: f64 = -18.0;
/// A discharged battery freezes from here, °C.
const BATTERY_C: f64 = -7.0;

fn say(template: &str, fills: &[(&'static str, Fill)]) -> Option<Say> {
    Some(Say::fill(template, fills))
}

fn always(_: &Scene<'_>) -> Option<Say> {
    say("always", &[])
}

/// The soak is under a temperature.
fn under(scene: &Scene<'_>, celsius: f64) -> Option<Say> {
    let soak = scene.found.soak_c;
    (soak < celsius).then(|| Say::fill("the soak is {soak}", &[("soak", Temperature(soak).into())]))
}

fn heated(scene: &Scene<'_>) -> Option<Say> {
    let watts = scene.plan.filter(|plan| plan.kind.heats())?.heater_w?;
    say("the plan heats with {heater}", &[("heater", Power(watts).into())])
}

fn immersed(scene: &Scene<'_>) -> Option<Say> {
    (scene.case.element.kind == crate::heat::ElementKind::Immersion).then(|| heated(scene))?
}

fn engine(scene: &Scene<'_>) -> Option<&'static str> {
    match scene.case.machine.engine.as_deref() {
        Some("electric") => None,
        Some("diesel") => Some("diesel"),
        Some("petrol") => Some("petrol"),
        _ => Some("unknown"),
    }
}

fn reason(scene: &Scene<'_>, id: &str) -> Option<Say> {
    scene.found.reasons.iter().find(|reason| reason.id == id).map(|reason| reason.text.clone())
}

const fn is_ester(base: Base) -> bool {
    matches!(base, Base::Ester | Base::NaturalEster)
}

/// One trigger a caution, in no order: the table's order counts.
pub(super) static TRIGGERS: &[Trigger] = &[
    Trigger {
        id: "hose-rating",
        find: |scene| {
            let soak = scene.found.soak_c;
            match scene.case.machine.hose_rating.map(crate::quantity::Temperature::as_celsius) {
                Some(rating) if rating > soak => say(
                    "the hoses are rated to {rating}, the soak is {soak}",
                    &[("rating", Temperature(rating).into()), ("soak", Temperature(soak).into())],
                ),
                None if soak < DEEP_COLD_C => say(
                    "the soak is {soak} and no hose rating is given",
                    &[("soak", Temperature(soak).into())],
                ),
                _ => None,
            }
        },
    },
    Trigger { id: "lifting-stop", find: |scene| under(scene, DEEP_COLD_C) },
    Trigger { id: "open-flame", find: always },
    Trigger { id: "fluid-injection", find: always },
    Trigger {
        id: "carbon-monoxide",
        find: |scene| {
            let engine = engine(scene)?;
            say(
                if engine == "unknown" {
                    "what drives the pump is not given"
                } else {
                    "the engine is a {engine}"
                },
                &[("engine", engine.into())],
            )
        },
    },
    Trigger {
        id: "accumulator",
        find: |scene| {
            scene.case.machine.accumulator?;
            say("the machine has an accumulator", &[])
        },
    },
    Trigger { id: "stored-energy", find: always },
    Trigger { id: "element-covered", find: immersed },
    Trigger {
        id: "flash-point",
        find: |scene| {
            immersed(scene)?;
            match scene.oil.flash_point().map(crate::quantity::Temperature::as_celsius) {
                None => say("the flash point is not known", &[]),
                Some(flash) if flash < LOW_FLASH_C => {
                    say("the flash point is {flash}", &[("flash", Temperature(flash).into())])
                }
                Some(_) => None,
            }
        },
    },
    Trigger { id: "ground-fault", find: heated },
    Trigger {
        id: "cords",
        find: |scene| {
            let because = heated(scene)?;
            let other = scene.case.supply.map_or(0.0, |supply| supply.other_load.as_watts());
            Some(if other > 0.0 {
                because.then(Say::fill(
                    "beside {other} on the same circuit",
                    &[("other", Power(other).into())],
                ))
            } else {
                because
            })
        },
    },
    Trigger { id: "unattended-heating", find: heated },
    Trigger {
        id: "starting-fluid",
        find: |scene| match (engine(scene)?, scene.case.machine.intake_heater) {
            (_, Some(false)) => None,
            (_, Some(true)) => say("the engine has glow plugs or an intake heater", &[]),
            (_, None) => {
                say("whether the engine has glow plugs or an intake heater is not given", &[])
            }
        },
    },
    Trigger {
        id: "frozen-battery",
        find: |scene| {
            engine(scene)?;
            under(scene, BATTERY_C)
        },
    },
    Trigger {
        id: "towing",
        find: |scene| match scene.case.pump.neutral {
            Some(Neutral::ClosedLoop) => say("the pump works in a closed loop", &[]),
            None => say("whether the pump works in a closed loop is not given", &[]),
            Some(_) => None,
        },
    },
    Trigger {
        id: "lifting",
        find: |scene| {
            let soak = scene.found.soak_c;
            (soak >= DEEP_COLD_C).then(|| under(scene, LIFTING_C))?
        },
    },
    Trigger {
        id: "inlet-unproven",
        find: |scene| {
            scene
                .found
                .limits
                .iter()
                .any(|limit| {
                    limit.id == super::LimitId::InletPressureStart && limit.met_at_soak.is_none()
                })
                .then(|| "suction line or displacement is not given".into())
        },
    },
    Trigger { id: "pour-point-unknown", find: |scene| reason(scene, "pour-point-unknown") },
    Trigger { id: "case-pressure", find: |scene| reason(scene, "case-pressure") },
    Trigger {
        id: "ester-hoses",
        find: |scene| {
            (is_ester(scene.oil.base()) || scene.oil.base() == Base::Glycol).then(|| {
                Say::fill("the oil is a {base}", &[("base", scene.oil.base().id().into())])
            })
        },
    },
    Trigger {
        id: "standing-oils",
        find: |scene| {
            is_ester(scene.oil.base()).then(|| {
                Say::fill("the oil is a {base}", &[("base", scene.oil.base().id().into())])
            })
        },
    },
    Trigger {
        id: "little-in-hand",
        find: |scene| {
            let k = scene.found.in_hand_k()?;
            let cold = scene.is(&[PlanKind::StartCold, PlanKind::ChangeOil]);
            (cold && k < scene.case.policy.limits.in_hand_k).then(|| {
                Say::fill("{in_hand} over the start floor", &[("in_hand", Difference(k).into())])
            })
        },
    },
    Trigger { id: "cold-metal", find: |scene| under(scene, 0.0) },
    Trigger { id: "cold-stress", find: |scene| under(scene, EXTREME_C) },
    Trigger {
        id: "hot-oil-burns",
        find: |scene| {
            if scene.plan.is_some() && scene.changed() {
                return say("the oil is changed warm", &[]);
            }
            heated(scene)
        },
    },
    Trigger { id: "thin-hot", find: |scene| reason(scene, "thin-hot") },
    Trigger {
        id: "hot-oil-cold-pump",
        find: |scene| {
            let difference = scene.pump_difference_k();
            (difference > scene.case.policy.heat.warming_over_soak_k
                || (scene.heated() && scene.found.heating.pump_warming))
                .then(|| {
                    Say::fill(
                        "the oil may be {difference} hotter than the pump",
                        &[("difference", Difference(difference).into())],
                    )
                })
        },
    },
    Trigger { id: "stiff-seals", find: |scene| under(scene, STIFF_SEALS_C) },
    Trigger { id: "water-in-oil", find: |scene| under(scene, 0.0) },
    Trigger { id: "mixing-oils", find: changed },
    Trigger {
        id: "seal-compatibility",
        find: |scene| {
            changed(scene)?;
            let old = scene.decision.in_service.and_then(|at| scene.case.oils.get(at));
            match old {
                Some(old) if old.base() == scene.oil.base() => None,
                Some(old) => say(
                    "from {old} to {new}",
                    &[("old", old.base().id().into()), ("new", scene.oil.base().id().into())],
                ),
                None => say("the oil in the machine is not given", &[]),
            }
        },
    },
    Trigger { id: "filter-bypass", find: always },
    Trigger {
        id: "heater-tight",
        find: |scene| {
            let warmed = scene.is(&[PlanKind::Heat, PlanKind::ChangeAndHeat]);
            (warmed && scene.found.heating.tight)
                .then(|| "the heater covers the loss as computed only".into())
        },
    },
    Trigger {
        id: "no-supply",
        find: |scene| {
            heated(scene)?;
            scene.case.supply.is_none().then(|| "supply is not given".into())
        },
    },
    Trigger { id: "limit-does-not-fit", find: |scene| reason(scene, "limit-does-not-fit") },
    Trigger {
        id: "index-mismatch",
        find: |scene| {
            let oil = scene.case.oils.iter().find(|oil| oil.index_differs())?;
            say("of {oil}", &[("oil", oil.name().into())])
        },
    },
    Trigger {
        id: "below-pour-heating",
        find: |scene| {
            heated(scene)?;
            (scene.oil.estimate(scene.found.tank_soak_c).reach == Reach::BelowPour)
                .then(|| "the tank starts within 5 K (9 °F) of the pour point".into())
        },
    },
    Trigger {
        id: "judged-range",
        find: |scene| {
            let floor = scene.found.start_floor.at_c?;
            let reach = scene.oil.estimate(floor).reach;
            (reach != Reach::BetweenPoints).then(|| {
                Say::fill(
                    "the line is stretched to the start floor, {floor} ({reach})",
                    &[("floor", Temperature(floor).into()), ("reach", reach.words().into())],
                )
            })
        },
    },
    Trigger { id: "oils-not-judged", find: always },
    Trigger { id: "manual-first", find: always },
];

fn changed(scene: &Scene<'_>) -> Option<Say> {
    (scene.plan.is_some() && scene.changed()).then(|| {
        Say::fill("the plan changes the oil to {oil}", &[("oil", scene.oil.name().into())])
    })
}

/// The cautions that apply, gravest first.
pub(super) fn cautions(scene: &Scene<'_>) -> Vec<Caution> {
    let mut found: Vec<Caution> = TABLE
        .iter()
        .filter_map(|row| {
            let trigger = TRIGGERS.iter().find(|trigger| trigger.id == row.id)?;
            Some(Caution { row, because: (trigger.find)(scene)? })
        })
        .collect();
    found.sort_by_key(|caution| (!caution.row.stop, caution.row.signal() as u8));
    found
}

/// Every caution there is.
#[must_use]
pub fn caution_rows() -> &'static [CautionRow] {
    &TABLE
}

#[cfg(test)]
mod tests {
    use super::{TABLE, TRIGGERS};
    use crate::advice::Signal;

    #[test]
    fn every_row_has_a_trigger_and_every_trigger_a_row() {
        assert!(TABLE.len() > 30, "the table did not parse");
        for row in TABLE.iter() {
            assert_eq!(TRIGGERS.iter().filter(|t| t.id == row.id).count(), 1, "{}", row.id);
            assert!(row.signal.parse::<Signal>().is_ok(), "{}: {}", row.id, row.signal);
            assert!(!row.source.is_empty() && row.text.ends_with('.'), "{}", row.id);
        }
        for trigger in TRIGGERS {
            assert_eq!(TABLE.iter().filter(|r| r.id == trigger.id).count(), 1, "{}", trigger.id);
        }
    }
}
