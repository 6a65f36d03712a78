//! The one table of limits: id, side, method, and the temperature from which each is met.

use super::setup::{Setup, unproven_or_given};
use crate::pump::INLET_BALANCE;
use crate::solve;
use crate::source::{Method, Source};

/// A limit.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord)]
#[allow(missing_docs, reason = "the names are the ids and the table says what they are")]
#[non_exhaustive]
pub enum LimitId {
    PourMargin,
    ViscosityStart,
    InletPressureStart,
    ViscosityWork,
    InletPressureLight,
    InletPressureWork,
    ViscosityMin,
    LineFlow,
}

impl LimitId {
    /// The id as it stands in JSON and on screen.
    #[must_use]
    pub const fn id(self) -> &'static str {
        match self {
            Self::PourMargin => "pour-margin",
            Self::ViscosityStart => "viscosity-start",
            Self::InletPressureStart => "inlet-pressure-start",
            Self::ViscosityWork => "viscosity-work",
            Self::InletPressureLight => "inlet-pressure-light",
            Self::InletPressureWork => "inlet-pressure-work",
            Self::ViscosityMin => "viscosity-min",
            Self::LineFlow => "line-flow",
        }
    }
}

impl LimitId {
    /// The case keys a limit hangs on, its oil's aside.
    #[must_use]
    pub const fn keys(self) -> &'static [&'static str] {
        match self {
            Self::PourMargin | Self::LineFlow => &["duty.standing"],
            Self::ViscosityStart => {
                &["pump.viscosity_start_max", "suction", "pump.displacement", "site.elevation"]
            }
            Self::InletPressureStart => &[
                "pump.inlet_pressure_start_min",
                "pump.start_speed",
                "suction.oil_above_pump",
                "suction.strainer.at_density",
                "site.elevation",
            ],
            Self::ViscosityWork => &["pump.viscosity_work_max"],
            Self::InletPressureLight | Self::InletPressureWork => &[
                "pump.inlet_pressure_work_min",
                "pump.work_speed",
                "suction.oil_above_pump",
                "suction.strainer.at_density",
                "site.elevation",
            ],
            Self::ViscosityMin => &["pump.viscosity_min"],
        }
    }
}

/// Which floor a limit belongs to.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Side {
    /// Before the pump is turned.
    Start,
    /// Before light work.
    Light,
    /// Before full load.
    Work,
    /// The hot end.
    Hot,
    /// In hoses and pilot lines.
    Line,
}

impl Side {
    /// The side as it stands in JSON.
    #[must_use]
    pub const fn id(self) -> &'static str {
        match self {
            Self::Start => "start",
            Self::Light => "light",
            Self::Work => "work",
            Self::Hot => "hot",
            Self::Line => "line",
        }
    }
}

/// On which edge of the likely range a cold limit is judged.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Edge {
    /// The thick edge: what a floor is.
    Thick,
    /// The expected viscosity: shown beside it.
    Expected,
}

/// What a limit comes to.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Outcome {
    /// Met from this temperature up, °C (hot side: down).
    At(f64),
    /// Met over the whole range searched, whose end this is, °C.
    NeverBites {
        /// The end of the search.
        to: f64,
    },
    /// Not met even at the far end of the search.
    Unattainable(Why),
    /// Could not be checked.
    NotChecked(Why),
}

impl Outcome {
    /// The temperature, °C, where there is one.
    #[must_use]
    pub const fn temperature(self) -> Option<f64> {
        match self {
            Self::At(t) | Self::NeverBites { to: t } => Some(t),
            Self::Unattainable(_) | Self::NotChecked(_) => None,
        }
    }

    /// The status as it stands in JSON.
    #[must_use]
    pub const fn status(self) -> &'static str {
        match self {
            Self::At(_) => "at",
            Self::NeverBites { .. } => "never-bites",
            Self::Unattainable(_) => "unattainable",
            Self::NotChecked(_) => "not-checked",
        }
    }

    /// Another outcome in place of a typical limit that does not fit the machine.
    pub(super) fn or_if_misfit(self, instead: Option<Self>) -> Self {
        match self {
            Self::NotChecked(Why::TypicalLimitDoesNotFit) => instead.unwrap_or(self),
            _ => self,
        }
    }

    /// Why there is no temperature.
    #[must_use]
    pub const fn why(self) -> Option<Why> {
        match self {
            Self::Unattainable(why) | Self::NotChecked(why) => Some(why),
            Self::At(_) | Self::NeverBites { .. } => None,
        }
    }
}

/// Why a limit has no temperature.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[non_exhaustive]
pub enum Why {
    /// The pour point is not given.
    PourPointUnknown,
    /// No suction line is given.
    NoSuctionLine,
    /// No displacement is given.
    NoDisplacement,
    /// Still too thick at the hot end of the search.
    TooThick,
    /// The inlet pressure is too low even with hot oil.
    InletTooLow,
    /// The local air pressure leaves nothing over the pump's limit.
    NoPressureLeft,
    /// The typical limit would not even let hot oil pass: it does not fit this machine.
    TypicalLimitDoesNotFit,
    /// Too thin over the whole search.
    TooThin,
}

impl std::fmt::Display for Why {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.write_str(match self {
            Self::PourPointUnknown => "the pour point is not given",
            Self::NoSuctionLine => "the suction line is not given",
            Self::NoDisplacement => "the pump displacement is not given",
            Self::TooThick => "too thick at every temperature searched",
            Self::InletTooLow => "the inlet pressure stays under the limit even with hot oil",
            Self::NoPressureLeft => {
                "the air pressure at this elevation leaves nothing over the pump's limit"
            }
            Self::TypicalLimitDoesNotFit => {
                "the typical limit is missed even by hot oil, so it does not fit this machine"
            }
            Self::TooThin => "too thin at every temperature searched",
        })
    }
}

/// One limit.
#[derive(Debug)]
pub struct LimitRow {
    /// Its id.
    pub id: LimitId,
    /// Which floor it belongs to.
    pub side: Side,
    /// How it is found.
    pub method: &'static Method,
    /// Finds it on one edge of the likely range.
    pub find: fn(&Setup<'_>, Edge) -> Outcome,
}

/// Start no colder than so many kelvin over the pour point.
pub static POUR_MARGIN: Method = Method {
    name: "pour point + margin",
    source: Source::publication(
        "M. G. Rabie, Fluid Power Engineering (2009), p. 45: at least 10 K over the pour point; MIL-HDBK-1022A, 8.10: 11 K before pumping fuel oil",
    ),
};

/// The oil must flow in hoses and pilot lines.
pub static LINE_FLOW: Method = Method {
    name: "pour point + one step of the pour test",
    source: Source::judgement("ISO 3016 reads pour points in steps of 3 K"),
};

/// The viscosity against a limit of the pump.
pub static VISCOSITY_LIMIT: Method = Method {
    name: "thick edge of the likely range against the pump's limit",
    source: Source::quoted("ASTM D341-20 for the line; this project's judgement for its edges"),
};

/// The thin edge against the least viscosity of the pump.
pub static VISCOSITY_FLOOR: Method = Method {
    name: "thin edge of the likely range, sheared, against the pump's least viscosity",
    source: Source::quoted("ASTM D341-20 for the line; this project's judgement for its edges"),
};

/// The limits, in the order in which a tie is decided.
pub static LIMITS: &[LimitRow] = &[
    LimitRow {
        id: LimitId::PourMargin,
        side: Side::Start,
        method: &POUR_MARGIN,
        find: pour_margin,
    },
    LimitRow {
        id: LimitId::ViscosityStart,
        side: Side::Start,
        method: &VISCOSITY_LIMIT,
        find: viscosity_start,
    },
    LimitRow {
        id: LimitId::InletPressureStart,
        side: Side::Start,
        method: &INLET_BALANCE,
        find: inlet_start,
    },
    LimitRow {
        id: LimitId::ViscosityWork,
        side: Side::Work,
        method: &VISCOSITY_LIMIT,
        find: viscosity_work,
    },
    LimitRow {
        id: LimitId::InletPressureLight,
        side: Side::Light,
        method: &INLET_BALANCE,
        find: inlet_light,
    },
    LimitRow {
        id: LimitId::InletPressureWork,
        side: Side::Work,
        method: &INLET_BALANCE,
        find: inlet_work,
    },
    LimitRow {
        id: LimitId::ViscosityMin,
        side: Side::Hot,
        method: &VISCOSITY_FLOOR,
        find: viscosity_min,
    },
    LimitRow { id: LimitId::LineFlow, side: Side::Line, method: &LINE_FLOW, find: line_flow },
];

/// Floors are known to this, K.
const CLOSE: f64 = 1e-6;

fn pour_margin(setup: &Setup<'_>, _: Edge) -> Outcome {
    setup.pour_floor_c().map_or(Outcome::NotChecked(Why::PourPointUnknown), Outcome::At)
}

fn line_flow(setup: &Setup<'_>, _: Edge) -> Outcome {
    setup.line_floor_c().map_or(Outcome::NotChecked(Why::PourPointUnknown), Outcome::At)
}

/// The start limit of the pump, tightened where the inlet cannot be checked.
fn viscosity_start(setup: &Setup<'_>, edge: Edge) -> Outcome {
    let limit = unproven_or_given(setup.case);
    if limit <= 0.0 {
        return Outcome::Unattainable(Why::NoPressureLeft);
    }
    thinner_than(setup, edge, limit)
}

fn viscosity_work(setup: &Setup<'_>, edge: Edge) -> Outcome {
    thinner_than(setup, edge, setup.case.pump.viscosity_work_max.as_mm2_per_s())
}

/// What a floor asks for in place of a typical inlet limit that does not fit the machine: oil as thin
/// as the limit was tried with. A limit that just fits asks for no more, so a floor never falls
/// where it stops to fit.
pub(super) fn in_place_of_misfit(setup: &Setup<'_>, edge: Edge) -> Outcome {
    thinner_than(setup, edge, setup.case.policy.limits.misfit_viscosity_mm2_s)
}

/// The lowest temperature from which the oil is no thicker than `limit`: viscosity falls on warming,
/// so there is one crossing at most.
fn thinner_than(setup: &Setup<'_>, edge: Edge, limit: f64) -> Outcome {
    let excess = |t: f64| (setup.viscosity(edge, t) / limit).ln();
    let (from, to) = (setup.bottom_c, setup.case.policy.limits.search_to_c);
    if excess(from) <= 0.0 {
        return Outcome::NeverBites { to: from };
    }
    match solve::root(excess, from, to, CLOSE) {
        Some(t) => Outcome::At(t),
        None => Outcome::Unattainable(Why::TooThick),
    }
}

fn inlet_start(setup: &Setup<'_>, edge: Edge) -> Outcome {
    let pump = &setup.case.pump;
    inlet(setup, edge, pump.start_speed.as_rpm(), pump.inlet_start_min.as_kpa(), false)
}

fn inlet_light(setup: &Setup<'_>, edge: Edge) -> Outcome {
    let pump = &setup.case.pump;
    let rpm = setup.case.policy.limits.light_speed_share * pump.work_speed.as_rpm();
    inlet(setup, edge, rpm, pump.inlet_work_min.as_kpa(), pump.inlet_work_assumed)
}

fn inlet_work(setup: &Setup<'_>, edge: Edge) -> Outcome {
    let pump = &setup.case.pump;
    let rpm = pump.work_speed.as_rpm();
    inlet(setup, edge, rpm, pump.inlet_work_min.as_kpa(), pump.inlet_work_assumed)
}

/// The lowest temperature from which the inlet pressure stays over its limit all the way up: what is
/// lost on the way to the pump falls on warming, but for the hump of the transition, which counts
/// for every thicker oil.
fn inlet(setup: &Setup<'_>, edge: Edge, rpm: f64, least_kpa: f64, assumed: bool) -> Outcome {
    let Some(line) = &setup.inlet else {
        return Outcome::NotChecked(if setup.case.suction.is_none() {
            Why::NoSuctionLine
        } else {
            Why::NoDisplacement
        });
    };
    let q = setup.flow_per_rpm * rpm;
    if assumed {
        let misfit = setup.case.policy.limits.misfit_viscosity_mm2_s;
        if line.pressure_kpa(q, misfit, setup.bulk.density_15()) < least_kpa {
            return Outcome::NotChecked(Why::TypicalLimitDoesNotFit);
        }
    }
    let (from, to) = (setup.bottom_c, setup.case.policy.limits.search_to_c);
    // Hot oil that flows turbulently passes the hump of the transition on its way up.
    // There it loses at most 1.6 times what it loses at a Reynolds number of 2000 (friction factor
    // 0.032 there, under 0.051 on the hump of any hose): where that leaves enough, no search.
    let turbulent = line.reynolds(q, setup.viscosity(edge, to)) > 2000.0;
    let at_2000 = line.balance(q, line.reynolds(q, 1.0) / 2000.0, setup.bulk.density(from));
    let full = at_2000.tank + at_2000.head.min(0.0);
    let harmless = line.line().is_smooth()
        && 1.6 * (at_2000.tank + at_2000.head - at_2000.pressure) <= full - least_kpa;
    let hump = if turbulent && !harmless { line.hump_viscosity(q) } else { f64::INFINITY };
    // The logarithm of what may be lost over what is lost: nearly straight in temperature.
    let margin = |t: f64| {
        let (nu, rho) = (setup.viscosity(edge, t), setup.bulk.density(t));
        let balance = line.balance(q, nu, rho);
        let full = balance.tank + balance.head;
        let pressure = if nu > hump {
            balance.pressure.min(line.pressure_kpa(q, hump, rho))
        } else {
            balance.pressure
        };
        let (spare, lost) = (full - least_kpa, full - pressure);
        if spare > 0.0 { (spare / lost).ln() } else { -1.0 }
    };
    if margin(to) < 0.0 {
        return Outcome::Unattainable(Why::InletTooLow);
    }
    if margin(from) >= 0.0 {
        return Outcome::NeverBites { to: from };
    }
    // A root is there by construction; not finding one would mean the balance is no number.
    solve::root(margin, from, to, CLOSE)
        .map_or(Outcome::Unattainable(Why::InletTooLow), Outcome::At)
}

fn viscosity_min(setup: &Setup<'_>, _: Edge) -> Outcome {
    let least = setup.case.pump.viscosity_min.as_mm2_per_s();
    let (from, to) = (setup.bottom_c, setup.case.policy.limits.hot_search_to_c);
    let excess = |t: f64| (setup.oil.low(t) / least).ln();
    if excess(to) >= 0.0 {
        return Outcome::NeverBites { to };
    }
    solve::root(excess, from, to, CLOSE).map_or(Outcome::Unattainable(Why::TooThin), Outcome::At)
}
