//! The operator's card: what is taped inside the cab. One page, large figures rounded to the safe side,
//! steps to tick.
//!
//! Invariant: a floor is rounded up and a most is rounded down, whatever the units.

use super::document::Line;
use super::units::{Shown, fixed};
use crate::advice::{Advice, Bound, Phase, PlanKind, Reading, Signal, Step};
use crate::case::{Case, Units};
use crate::oil::Oil;

/// The card's parts.
#[derive(Debug, Clone, PartialEq)]
pub struct Card {
    /// Machine and site.
    pub title: String,
    /// What to do, in a line.
    pub headline: String,
    /// Name and large figure.
    pub gates: Vec<(&'static str, Line)>,
    /// Name and value.
    pub facts: Vec<(&'static str, Line)>,
    /// What to do; whether a reading is written down.
    pub steps: Vec<(Line, bool)>,
    /// When to stop.
    pub stops: Vec<Line>,
    /// Signal word, id, a few words.
    pub cautions: Vec<(Signal, String, String)>,
    /// What it holds for.
    pub holds: Line,
}

/// Builds the card.
#[must_use]
pub fn card(case: &Case, advice: &Advice, units: Units) -> Card {
    let page = Page { case, advice, shown: Shown(units), us: units == Units::Us };
    let decision = &advice.decision;
    let at = decision.focus().unwrap_or(0);
    let oil = case.oils.get(at).map_or("-", Oil::name);
    Card {
        title: case.title.clone(),
        headline: page.headline(oil),
        gates: page.gates(at),
        facts: page.facts(at),
        steps: page.steps(),
        stops: page.stops(),
        cautions: advice
            .cautions
            .iter()
            .map(|caution| {
                (caution.row.signal(), caution.row.id.clone(), caution.row.short.clone())
            })
            .collect(),
        holds: Line::from(format!("Holds for {oil}, this season, down to "))
            .figure(
                page.least(case.site.minimum.as_celsius()),
                "/site/minimum_c",
            )
            .words(", at this elevation only. Colder, another oil, another hose or place: do not use it."),
    }
}

struct Page<'a> {
    case: &'a Case,
    advice: &'a Advice,
    shown: Shown,
    us: bool,
}

impl Page<'_> {
    /// A temperature that must at least be read: up to the whole degree.
    fn least(&self, celsius: f64) -> String {
        self.whole(celsius, f64::ceil)
    }

    /// A temperature that must not be passed: down to the whole degree.
    fn most(&self, celsius: f64) -> String {
        self.whole(celsius, f64::floor)
    }

    fn whole(&self, celsius: f64, round: fn(f64) -> f64) -> String {
        // A figure that is whole but for its last bit is not pushed a degree on.
        let settle = |value: f64| (value * 1e6).round() / 1e6;
        if self.us {
            format!("{} °F", fixed(round(settle(celsius * 1.8 + 32.0)), 0))
        } else {
            format!("{} °C", fixed(round(settle(celsius)), 0))
        }
    }

    /// A vacuum that must not be passed: down to the half kPa and the half inHg.
    fn vacuum(&self, kpa: f64) -> String {
        let half = |value: f64| (value * 2.0 + 1e-9).floor() / 2.0;
        let (kpa, inhg) = (half(kpa), half(kpa / 3.386_389));
        if self.us {
            format!("{} inHg ({} kPa)", fixed(inhg, 1), fixed(kpa, 1))
        } else {
            format!("{} kPa ({} inHg)", fixed(kpa, 1), fixed(inhg, 1))
        }
    }

    fn speed(rpm: f64) -> String {
        format!("{} rpm", fixed((rpm / 10.0 + 1e-9).floor() * 10.0, 0))
    }

    fn headline(&self, oil: &str) -> String {
        match self.advice.decision.chosen().map(|plan| plan.kind) {
            None => "DO NOT START at the site minimum: no plan is allowed.".to_owned(),
            Some(PlanKind::StartCold | PlanKind::ChangeOil) => {
                format!("Starts cold on {oil}.")
            }
            Some(PlanKind::StartWarmTank) => {
                format!("Starts on the warmth of the tank, {oil}; hose and pump are cold.")
            }
            Some(PlanKind::Heat | PlanKind::ChangeAndHeat) => {
                format!("Heat the tank, then start on {oil}.")
            }
            Some(PlanKind::BlanketAndHold) => format!("Covered and held warm all night, {oil}."),
            Some(PlanKind::WholeMachineHeat) => {
                "Keep the whole machine warm; no start from cold.".to_owned()
            }
            Some(PlanKind::KeepRunning) => "Do not switch off in this cold.".to_owned(),
        }
    }

    fn gates(&self, at: usize) -> Vec<(&'static str, Line)> {
        let Some(found) = self.advice.decision.oils.get(at) else { return Vec::new() };
        let floor = |t: Option<f64>, key: &str| match t {
            Some(t) => Line::new().figure(self.least(t), format!("/oils/{at}/{key}")),
            None => Line::from("never"),
        };
        vec![
            ("do not turn the pump below", floor(found.start_floor.at_c, "start_floor_c")),
            ("light work from", floor(found.light_floor.at_c, "light_floor_c")),
            ("full load from", floor(found.work_floor.at_c, "work_floor_c")),
        ]
    }

    /// The first step of a phase with a reading, and its place.
    fn gate(&self, phase: Phase, reading: Reading) -> Option<(usize, &Step)> {
        self.advice
            .procedure
            .iter()
            .enumerate()
            .find(|(_, s)| s.phase == phase && s.gate.is_some_and(|g| g.reading == reading))
    }

    fn bound(&self, phase: Phase, reading: Reading) -> Option<(String, f64)> {
        let (at, step) = self.gate(phase, reading)?;
        let (key, value) = match step.gate?.bound {
            Bound::AtLeastC(v) => ("at_least_c", v),
            Bound::AtMostK(v) => ("at_most_k", v),
            Bound::AtMostKpa(v) => ("at_most_kpa", v),
            Bound::AtMostRpm(v) => ("at_most_rpm", v),
            Bound::AtLeastS(v) => ("at_least_s", v),
        };
        Some((format!("/procedure/{at}/gate/{key}"), value))
    }

    fn facts(&self, at: usize) -> Vec<(&'static str, Line)> {
        let decision = &self.advice.decision;
        let Some(found) = decision.oils.get(at) else { return Vec::new() };
        let mut facts = Vec::new();
        if let Some((clock, days)) = decision.choice.switch_on {
            let day = match days {
                0 => " same morning",
                1 => " day before",
                _ => " days before",
            };
            facts.push((
                "heater on",
                Line::new().figure(clock.to_string(), "/choice/switch_on/clock").words(day),
            ));
        }
        let heats = decision.chosen().is_some_and(|plan| plan.kind.heats());
        if let Some(t) = found.heating.thermostat_c.filter(|_| heats) {
            facts.push((
                "thermostat",
                Line::new()
                    .figure(self.shown.temperature(t), format!("/oils/{at}/heating/thermostat_c")),
            ));
        }
        let held = decision.chosen().is_some_and(|plan| plan.kind == PlanKind::BlanketAndHold);
        if let Some(s) = found.heating.gate_valid_s.filter(|_| heats && !held) {
            facts.push((
                "start within",
                Line::new()
                    .figure(
                        self.shown.time((s / 60.0).floor() * 60.0),
                        format!("/oils/{at}/heating/gate_valid_s"),
                    )
                    .words(" of unplugging"),
            ));
        }
        if let Some((pointer, kpa)) = self.bound(Phase::FirstTurn, Reading::InletVacuum) {
            facts.push(("vacuum at most", Line::new().figure(self.vacuum(kpa), pointer)));
        }
        if let Some((pointer, rpm)) = self.bound(Phase::FirstTurn, Reading::PumpSpeed) {
            facts.push(("first turn at most", Line::new().figure(Self::speed(rpm), pointer)));
        }
        if let Some(t) = found.hot_ceiling_c {
            facts.push((
                "do not run above",
                Line::new().figure(self.most(t), format!("/oils/{at}/hot_ceiling_c")),
            ));
        }
        facts.push(("shift starts", Line::from(self.case.duty.shift_start.to_string())));
        facts
    }

    fn steps(&self) -> Vec<(Line, bool)> {
        let Some(plan) = self.advice.decision.chosen() else {
            return vec![(
                Line::from("Do not turn the pump. Tell the person answerable for the machine."),
                false,
            )];
        };
        let mut steps: Vec<(Line, bool)> = Vec::new();
        let mut tick = |line: Line, reading: bool| steps.push((line, reading));
        if plan.kind.heats() {
            tick(
                Line::from(
                    "Evening: park level, covers on, thermostat and timer set, element under oil, cord sound.",
                ),
                false,
            );
        } else {
            tick(Line::from("Evening: park level, attachments on blocks, levers neutral."), false);
        }
        if plan.kind == PlanKind::KeepRunning {
            tick(
                Line::from(
                    "All night: oil at the suction read every half hour, somebody on watch, in the open air.",
                ),
                true,
            );
        } else {
            tick(
                Line::from(
                    "Jar of sump oil stood outside: in the morning it must run, without ice.",
                ),
                false,
            );
        }
        tick(
            Line::from("Air at the machine, not under ")
                .figure(self.least(self.case.site.minimum.as_celsius()), "/site/minimum_c"),
            true,
        );
        tick(
            Line::from(
                "Level covers suction and heater (reads low when cold: do not top up). Suction valve open, breather free, hoses not bent, nobody near.",
            ),
            false,
        );
        if plan.kind.heats() {
            tick(Line::from("Heater has worked. Off, unplugged, cord stowed."), false);
        }
        if let Some((pointer, t)) = self.bound(Phase::Crank, Reading::OilAtSuction) {
            tick(
                Line::from("Oil where it leaves the tank, by probe: ")
                    .figure(self.least(t), pointer)
                    .words(" or warmer"),
                true,
            );
        }
        if let Some((pointer, s)) = self.bound(Phase::Crank, Reading::Time) {
            tick(
                Line::from("Cold oil in the hose: crank without fuel, or jog, ")
                    .figure(format!("{} s", fixed(s.ceil(), 0)), pointer)
                    .words(" or longer"),
                false,
            );
        }
        if self.bound(Phase::Crank, Reading::InletVacuum).is_some() {
            tick(
                Line::from(
                    "Oil in the hose may have set: warm the line, jog without fuel until the vacuum falls.",
                ),
                false,
            );
        }
        if let Some((pointer, k)) = self.bound(Phase::Crank, Reading::PumpBody) {
            tick(
                Line::from("Pump body warmed until the oil is at most ")
                    .figure(self.shown.difference(k.floor()), pointer)
                    .words(" hotter than it"),
                true,
            );
        }
        if let Some((pointer, rpm)) = self.bound(Phase::FirstTurn, Reading::PumpSpeed) {
            tick(
                Line::from("Start unloaded, at most ")
                    .figure(Self::speed(rpm), pointer)
                    .words(", hands off the levers"),
                false,
            );
        }
        if let Some((pointer, kpa)) = self.bound(Phase::FirstTurn, Reading::InletVacuum) {
            tick(Line::from("Vacuum at most ").figure(self.vacuum(kpa), pointer), true);
        }
        tick(
            Line::from(
                "Circulate 5 to 10 minutes. Then one function at a time, slowly, three times each way; read the vacuum after each.",
            ),
            true,
        );
        tick(
            Line::from(
                "Motors both ways slowly. Brakes and steering tried. Off at a walking pace.",
            ),
            false,
        );
        let at = plan.oil;
        if let Some(found) = self.advice.decision.oils.get(at) {
            for (words, floor, key) in [
                ("Light work from ", found.light_floor.at_c, "light_floor_c"),
                ("Full load from ", found.work_floor.at_c, "work_floor_c"),
            ] {
                match floor {
                    Some(t) => tick(
                        Line::from(words).figure(self.least(t), format!("/oils/{at}/{key}")),
                        true,
                    ),
                    None => tick(Line::from(format!("{words}never: ask before loading it")), false),
                }
            }
        }
        tick(
            Line::from("Warm: set the level, read the filter indicator, leaks with cardboard."),
            false,
        );
        steps
    }

    fn stops(&self) -> Vec<Line> {
        let mut stops = vec![Line::from("pump screams or rattles: off within moments")];
        if let Some((pointer, kpa)) = self.bound(Phase::FirstTurn, Reading::InletVacuum) {
            stops.push(Line::from("vacuum over ").figure(self.vacuum(kpa), pointer));
        }
        stops.extend([
            Line::from("a jet, a leak, foam, a jerking function"),
            Line::from("brake or steering slow to answer"),
            Line::from(
                "a reading above is not reached: wait and warm, never override the pour point",
            ),
        ]);
        stops
    }
}
