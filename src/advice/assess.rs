//! The first tier: one oil in one case.

use super::first_turn::{self, Circulation, FirstTurn};
use super::heating::{self, Heating, HeatingStatus, HeatingWhy, Tank};
use super::limits::{Edge, LIMITS, LimitId, Outcome, Side, Why, in_place_of_misfit};
use super::say::{Figure, Fill, Reason};
use super::setup::Setup;
use crate::case::{Case, FluidKind};
use crate::oil::{Estimate, Oil};

/// One limit, judged on both edges.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LimitResult {
    /// The limit.
    pub id: LimitId,
    /// Its side.
    pub side: Side,
    /// On the thick edge (hot side: the thin one).
    pub outcome: Outcome,
    /// On the expected viscosity.
    pub expected: Outcome,
    /// Met at the soak; `None` where not checked.
    pub met_at_soak: Option<bool>,
}

/// A floor and the limit that sets it.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Floor {
    /// The floor, °C; `None` where a limit of it is unattainable.
    pub at_c: Option<f64>,
    /// The limit that sets it, or that is unattainable.
    pub set_by: Option<LimitId>,
}

/// The answer for one oil.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[allow(missing_docs, reason = "the names are the ids")]
#[non_exhaustive]
pub enum Verdict {
    StartsCold,
    StartsColdInletUnproven,
    NeedsHeat,
    NeedsWholeMachineHeat,
    NotSuited,
}

impl Verdict {
    /// The verdict as it stands in JSON.
    #[must_use]
    pub const fn id(self) -> &'static str {
        match self {
            Self::StartsCold => "starts-cold",
            Self::StartsColdInletUnproven => "starts-cold-inlet-unproven",
            Self::NeedsHeat => "needs-heat",
            Self::NeedsWholeMachineHeat => "needs-whole-machine-heat",
            Self::NotSuited => "not-suited",
        }
    }

    /// The verdict in words.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::StartsCold => "starts cold",
            Self::StartsColdInletUnproven => "starts cold, inlet not proven",
            Self::NeedsHeat => "needs heat in the tank",
            Self::NeedsWholeMachineHeat => "needs the whole machine heated",
            Self::NotSuited => "not suited",
        }
    }
}

/// Everything the first tier says of one oil in one case.
#[derive(Debug, Clone, PartialEq)]
pub struct Assessment {
    /// Temperature of pump, hoses and lines at shift start, °C.
    pub soak_c: f64,
    /// Temperature of the tank where heating starts, °C.
    pub tank_soak_c: f64,
    /// Viscosity at the soak.
    pub at_soak: Estimate,
    /// All limits, in table order.
    pub limits: Vec<LimitResult>,
    /// Do not turn the pump below.
    pub start_floor: Floor,
    /// The same on the expected viscosity.
    pub start_floor_expected: Floor,
    /// Light work from.
    pub light_floor: Floor,
    /// Full load from.
    pub work_floor: Floor,
    /// The same on the expected viscosity.
    pub work_floor_expected: Floor,
    /// Do not run above, °C.
    pub hot_ceiling_c: Option<f64>,
    /// Thin edge at the hottest oil of the season, mm²/s.
    pub low_at_max: f64,
    /// Heating.
    pub heating: Heating,
    /// First turn.
    pub first_turn: FirstTurn,
    /// Circulation.
    pub circulation: Circulation,
    /// The answer.
    pub verdict: Verdict,
    /// Why.
    pub reasons: Vec<Reason>,
}

/// Assesses one oil in one case.
///
/// # Example
/// ```
/// use coldsump::{advice, case::CaseFile};
/// let file = CaseFile::read("loader.toml", r#"
///     format = 1
///     site.minimum_temperature = "-20 °C"
///     pump.kind = "axial-piston"
///     reservoir.oil_volume = "200 L"
///     duty.time_to_warm = "4 h"
///     oil = [{ class = "HM 46", viscosity = { "40 °C" = "46 cSt", "100 °C" = "6.8 cSt" }, pour_point = "-24 °C" }]
/// "#);
/// let case = file.check().unwrap();
/// let found = advice::assess(&case, &case.oils[0]);
/// let floor = found.start_floor.at_c.unwrap();
/// assert!(floor > -12.0 && floor < 0.0);
/// assert_eq!(found.verdict.id(), "needs-heat");
/// ```
#[must_use]
pub fn assess(case: &Case, oil: &Oil) -> Assessment {
    let setup = Setup::new(case, oil);
    let limits: Vec<LimitResult> = LIMITS
        .iter()
        .map(|row| {
            let outcome = (row.find)(&setup, Edge::Thick);
            let met_at_soak = match (outcome, row.side) {
                (Outcome::NotChecked(_), _) => None,
                (Outcome::Unattainable(_), _) => Some(false),
                (Outcome::At(t) | Outcome::NeverBites { to: t }, Side::Hot) => {
                    Some(setup.soak_c <= t)
                }
                (Outcome::At(t) | Outcome::NeverBites { to: t }, _) => Some(setup.soak_c >= t),
            };
            LimitResult {
                id: row.id,
                side: row.side,
                outcome,
                expected: (row.find)(&setup, Edge::Expected),
                met_at_soak,
            }
        })
        .collect();
    let start = |side| matches!(side, Side::Start);
    let light = |result: &LimitResult| {
        start(result.side) || result.side == Side::Light || result.id == LimitId::ViscosityWork
    };
    let work = |side| matches!(side, Side::Start | Side::Work);
    let misfit = |edge| {
        // Seldom asked for: only where a typical limit does not fit.
        let any = limits.iter().any(|r| r.outcome.why() == Some(Why::TypicalLimitDoesNotFit));
        any.then(|| in_place_of_misfit(&setup, edge))
    };
    let (hot, hot_expected) = (misfit(Edge::Thick), misfit(Edge::Expected));
    let thick = |r: &LimitResult| r.outcome.or_if_misfit(hot);
    let expected = |r: &LimitResult| r.expected.or_if_misfit(hot_expected);
    let start_floor = floor(&limits, |r| start(r.side), thick);
    let light_floor = floor(&limits, light, thick);
    let work_floor = floor(&limits, |r| work(r.side), thick);
    let find = |id| limits.iter().find(|result: &&LimitResult| result.id == id);
    let gels = setup.line_floor_c().is_some_and(|line| setup.soak_c < line);

    let tank = Tank::new(&setup);
    let heating = heating::heating(&setup, &tank, start_floor.at_c, gels);
    let gate = start_floor.at_c.map(|floor| floor + case.policy.heat.gate_margin_k);
    // The hottest oil that can meet the cold pump: at the thermostat, or what the tank kept.
    let hottest = heating
        .thermostat_c
        .or_else(|| heating.whys.contains(&HeatingWhy::WarmEnough).then_some(tank.soak_c));
    let first_turn = first_turn::first_turn(&setup, gate, work_floor.at_c, hottest);
    // Heat that cannot be brought in is not counted on.
    let reached = heating.mean_target_c.filter(|_| heating.status != HeatingStatus::CannotReach);
    let tank_c = reached.unwrap_or(tank.soak_c);
    let circulation =
        first_turn::circulation(&setup, &tank, tank_c, start_floor.at_c, work_floor.at_c);
    let low_at_max = oil.low(case.duty.oil_temperature_max.as_celsius());
    let mut found = Assessment {
        soak_c: setup.soak_c,
        tank_soak_c: tank.soak_c,
        at_soak: oil.estimate(setup.soak_c),
        start_floor,
        start_floor_expected: floor(&limits, |r| start(r.side), expected),
        light_floor,
        work_floor,
        work_floor_expected: floor(&limits, |r| work(r.side), expected),
        hot_ceiling_c: find(LimitId::ViscosityMin).and_then(|r| r.outcome.temperature()),
        low_at_max,
        limits,
        heating,
        first_turn,
        circulation,
        verdict: Verdict::NotSuited,
        reasons: Vec::new(),
    };
    judge(&setup, gels, &mut found);
    found
}

impl Assessment {
    /// Whether a floor of this oil hangs on an input, by its key. Keys of an oil count where they
    /// make its viscosity.
    #[must_use]
    pub fn hangs_on(&self, key: &str) -> bool {
        let of_oil = key.starts_with("oil[")
            && [".base", ".viscosity", ".density"].iter().any(|end| key.ends_with(end));
        let floors = [self.start_floor, self.light_floor, self.work_floor];
        of_oil || floors.iter().filter_map(|floor| floor.set_by).any(|id| id.keys().contains(&key))
    }
}

/// The warmest of the limits that `belongs` picks.
fn floor(
    limits: &[LimitResult],
    belongs: impl Fn(&LimitResult) -> bool,
    outcome: impl Fn(&LimitResult) -> Outcome,
) -> Floor {
    let mut floor = Floor::default();
    for result in limits.iter().filter(|result| belongs(result)) {
        match outcome(result) {
            Outcome::Unattainable(_) => {
                return Floor { at_c: None, set_by: Some(result.id) };
            }
            Outcome::At(t) | Outcome::NeverBites { to: t } => {
                if floor.at_c.is_none_or(|warmest| t > warmest) {
                    floor = Floor { at_c: Some(t), set_by: Some(result.id) };
                }
            }
            Outcome::NotChecked(_) => {}
        }
    }
    floor
}

/// Verdict and reasons.
fn judge(setup: &Setup<'_>, gels: bool, found: &mut Assessment) {
    let case = setup.case;
    let mut because = |id, template: &str, fills: &[(&'static str, Fill)]| {
        found.reasons.push(Reason::new(id, template, fills));
    };
    let mut suited = true;
    for result in &found.limits {
        if let (Side::Start, Outcome::Unattainable(why)) = (result.side, result.outcome) {
            suited = false;
            because(
                "start-limit-unattainable",
                "{limit}: {why}",
                &[("limit", result.id.id().into()), ("why", why.to_string().into())],
            );
        }
        if let Outcome::NotChecked(why @ Why::TypicalLimitDoesNotFit) = result.outcome {
            because(
                "limit-does-not-fit",
                "{limit} not checked: {why}; until the pump's own limit is given its floor asks for oil of {hot} or thinner",
                &[
                    ("limit", result.id.id().into()),
                    ("why", why.to_string().into()),
                    ("hot", Figure::Viscosity(case.policy.limits.misfit_viscosity_mm2_s).into()),
                ],
            );
        }
    }
    let low = found.low_at_max;
    let mut thin = |id, short: &str, least: f64| {
        because(
            id,
            "at {max} it may thin to {low}, under the pump's {short} of {least}",
            &[
                ("max", Figure::Temperature(case.duty.oil_temperature_max.as_celsius()).into()),
                ("low", Figure::Viscosity(low).into()),
                ("short", short.into()),
                ("least", Figure::Viscosity(least).into()),
            ],
        );
    };
    if low < case.pump.viscosity_min_short.as_mm2_per_s() {
        suited = false;
        thin("too-thin-hot", "short minimum", case.pump.viscosity_min_short.as_mm2_per_s());
    } else if low < case.pump.viscosity_min.as_mm2_per_s() {
        thin("thin-hot", "minimum", case.pump.viscosity_min.as_mm2_per_s());
    }
    if case.duty.fluid == FluidKind::Biodegradable && setup.oil.biodegradable() != Some(true) {
        suited = false;
        because(
            "not-biodegradable",
            "a biodegradable oil is asked for, and it is not known to be one",
            &[],
        );
    }
    if gels {
        because("gels", "it gels in hoses and pilot lines at the soak temperature", &[]);
    }
    if setup.stands_too_long() {
        because(
            "standing",
            "a vegetable oil may set solid above its pour point after days in the cold",
            &[],
        );
    }
    if let (Some(found), Some(most)) =
        (found.first_turn.case_drain_kpa, case.case_drain.and_then(|drain| drain.pressure_max))
    {
        if found > most.as_kpa() {
            because(
                "case-pressure",
                "the case drain line builds {found} in the cold, over the {most} allowed",
                &[
                    ("found", Figure::Pressure(found).into()),
                    ("most", Figure::Pressure(most.as_kpa()).into()),
                ],
            );
        }
    }
    if setup.oil.class_only() {
        because(
            "class-only",
            "known by its class alone: limits of the class, not a measured oil",
            &[],
        );
    }
    if setup.oil.pour_point().is_none() {
        because(
            "pour-point-unknown",
            "the pour point is not given, so gelling was not checked",
            &[],
        );
    }
    let in_hand = found.start_floor.at_c.map(|floor| found.soak_c - floor);
    let unproven = found.limits.iter().any(|r| {
        r.id == LimitId::InletPressureStart && matches!(r.outcome, Outcome::NotChecked(_))
    });
    found.verdict = if !suited {
        Verdict::NotSuited
    } else if gels {
        Verdict::NeedsWholeMachineHeat
    } else if in_hand.is_none_or(|k| k < 0.0) {
        Verdict::NeedsHeat
    } else if unproven {
        Verdict::StartsColdInletUnproven
    } else {
        Verdict::StartsCold
    };
    if found.verdict == Verdict::NeedsHeat
        && found.tank_soak_c >= found.start_floor.at_c.unwrap_or(f64::INFINITY)
    {
        because("pump-cold", "the tank is warm enough, but pump and hoses are not", &[]);
    }
    if unproven && in_hand.is_some_and(|k| k >= 0.0) {
        because(
            "inlet-unproven",
            "the suction line was not checked: measure the hose's outside diameter and its length",
            &[],
        );
    }
    if let Some(k) = in_hand.filter(|k| (0.0..case.policy.limits.in_hand_k).contains(k)) {
        because(
            "little-in-hand",
            "only {in_hand} over its floor at the soak",
            &[("in_hand", Figure::Difference(k).into())],
        );
    }
}
