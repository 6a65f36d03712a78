//! The advice as a document: what to do first, then why, then how it was reached.

use super::document::{Block, Document, Line};
use super::units::{Shown, energy, fixed};
use crate::advice::{
    Advice, Assessment, Bound, Confirm, Floor, Gate, HeatingStatus, Lever, LimitId, Phase, Plan,
    PlanKind, Reading, Step, Verdict,
};
use crate::case::{Case, Units};
use crate::oil::Oil;

/// Levers shown on screen; all are in the JSON.
const LEVERS_SHOWN: usize = 5;
/// Pour points this low are those of synthetic or specially dewaxed oils, °C; common practice.
const LOW_POUR_C: f64 = -40.0;
/// Plans shown on screen besides those of the oil in service and the allowed ones.
const PLANS_SHOWN: usize = 12;

/// Builds the document.
#[must_use]
pub fn advice(case: &Case, advice: &Advice, units: Units) -> Document {
    let page = Page { case, advice, shown: Shown(units) };
    let mut blocks = vec![Block::Title(Line::from(case.title.clone()))];
    page.answer(&mut blocks);
    page.why(&mut blocks);
    page.cold(&mut blocks);
    page.oils(&mut blocks);
    page.plans(&mut blocks);
    page.winter(&mut blocks);
    page.ask_for(&mut blocks);
    page.procedure(&mut blocks);
    page.cautions(&mut blocks);
    page.confirm(&mut blocks);
    page.levers(&mut blocks);
    page.reached(&mut blocks);
    page.record(&mut blocks);
    Document { blocks }
}

struct Page<'a> {
    case: &'a Case,
    advice: &'a Advice,
    shown: Shown,
}

impl Page<'_> {
    fn focus(&self) -> Option<(usize, &Oil, &Assessment)> {
        let at = self.advice.decision.focus()?;
        Some((at, self.case.oils.get(at)?, self.advice.decision.oils.get(at)?))
    }

    /// What to do, in a few lines that can be read out over the radio.
    fn answer(&self, blocks: &mut Vec<Block>) {
        let decision = &self.advice.decision;
        for (at, caution) in self.advice.cautions.iter().enumerate() {
            if caution.row.stop {
                blocks.push(Block::Text(
                    Line::new()
                        .strong(format!("STOP - {}: ", caution.row.id))
                        .say(&caution.because, &format!("/cautions/{at}"), self.shown)
                        .words(format!(". {}", caution.row.text)),
                ));
            }
        }
        blocks.push(Block::Text(self.headline()));
        let Some((at, oil, found)) = self.focus() else { return };
        let base = format!("/oils/{at}");
        let mut pairs = vec![
            self.site(),
            ("oil".to_owned(), Line::from(name_of(oil))),
            (
                "do not turn the pump below".to_owned(),
                self.floor(&found.start_floor, &base, "start_floor_c"),
            ),
            ("light work from".to_owned(), self.floor(&found.light_floor, &base, "light_floor_c")),
            ("full load from".to_owned(), self.floor(&found.work_floor, &base, "work_floor_c")),
            (
                "do not run above".to_owned(),
                found.hot_ceiling_c.map_or_else(
                    || Line::from("too thin over the whole range searched"),
                    |t| {
                        Line::new()
                            .figure(self.shown.temperature(t), format!("{base}/hot_ceiling_c"))
                    },
                ),
            ),
        ];
        if let Some(plan) = decision.chosen() {
            self.heater(plan, found, &mut pairs);
        }
        blocks.push(Block::Pairs(pairs));
    }

    fn headline(&self) -> Line {
        let decision = &self.advice.decision;
        let Some((plan, oil)) =
            decision.chosen().and_then(|plan| Some((plan, self.case.oils.get(plan.oil)?)))
        else {
            return Line::new()
                .strong("No plan starts this machine at the site minimum.")
                .words(" Do not turn the pump. The oil to ask for is below.");
        };
        let name = name_of(oil);
        let line = match plan.kind {
            PlanKind::StartCold => Line::new().strong(format!("Start it cold on {name}.")),
            PlanKind::ChangeOil => {
                Line::new().strong(format!("Change the oil to {name}; then it starts cold."))
            }
            PlanKind::StartWarmTank => Line::new()
                .strong(format!("Start on the warmth left in the tank, {name}."))
                .words(" Clear the hose and warm the pump first: both are as cold as the night."),
            PlanKind::Heat => Line::new().strong(format!("Keep {name} and heat the tank.")),
            PlanKind::ChangeAndHeat => {
                Line::new().strong(format!("Change the oil to {name} and heat the tank."))
            }
            PlanKind::BlanketAndHold => Line::new()
                .strong(format!("Cover the tank and hold {name} warm through the night.")),
            PlanKind::WholeMachineHeat => Line::new()
                .strong("Keep the whole machine warm: shelter or hot air.")
                .words(self.nothing_else()),
            PlanKind::KeepRunning => {
                Line::new().strong("Do not switch it off in this cold.").words(self.nothing_else())
            }
        };
        let unproven = decision
            .oils
            .get(plan.oil)
            .is_some_and(|found| found.verdict == Verdict::StartsColdInletUnproven);
        if unproven {
            line.words(" The pump inlet was not checked: prove it with a vacuum gauge, or measure the suction hose (outside diameter, length) and work this out again.")
        } else {
            line
        }
    }

    fn nothing_else(&self) -> &'static str {
        if self.advice.decision.lacks_circuit() {
            " No oil starts it cold, and the circuit does not carry the tank heater that would."
        } else {
            " No oil and no tank heater starts it here."
        }
    }

    fn site(&self) -> (String, Line) {
        let site = &self.case.site;
        let mut line = Line::new()
            .figure(self.shown.temperature(site.minimum.as_celsius()), "/site/minimum_c");
        if site.heating != site.minimum {
            line = line
                .words(", heater sized for ")
                .figure(self.shown.temperature(site.heating.as_celsius()), "/site/heating_c");
        }
        line = line
            .words(", wind ")
            .figure(self.shown.wind(site.wind.as_m_per_s()), "/site/wind_m_s")
            .words(", air ")
            .figure(
                self.shown.pressure(crate::air::atmosphere_kpa(site.elevation.as_m())),
                "/site/air_kpa",
            );
        ("site minimum".to_owned(), line)
    }

    fn floor(&self, floor: &Floor, base: &str, key: &str) -> Line {
        match (floor.at_c, floor.set_by) {
            (Some(t), Some(by)) => Line::new()
                .figure(self.shown.temperature(t), format!("{base}/{key}"))
                .faint(format!(" ({})", limit_words(by))),
            (None, Some(by)) => Line::from(format!("never: {}", limit_words(by))),
            _ => Line::from("not known"),
        }
    }

    fn heater(&self, plan: &Plan, found: &Assessment, pairs: &mut Vec<(String, Line)>) {
        let at = self.advice.decision.choice.plan.unwrap_or(0);
        let base = format!("/plans/{at}");
        let oil = format!("/oils/{}/heating", plan.oil);
        if let Some(watts) = plan.heater_w {
            let mut line = Line::new().figure(self.shown.power(watts), format!("{base}/heater_w"));
            if plan.elements_w.len() > 1 {
                line = line.words(format!(" in {} elements", plan.elements_w.len()));
            }
            if let Some(thermostat) = found.heating.thermostat_c {
                line = line
                    .words(", thermostat ")
                    .figure(self.shown.temperature(thermostat), format!("{oil}/thermostat_c"));
            }
            if let Some(kwh) = plan.energy_kwh {
                line = line.words(", ").figure(energy(kwh), format!("{base}/energy_kwh"));
            }
            if let Some(amperes) =
                found.heating.current_a.filter(|_| plan.kind != PlanKind::BlanketAndHold)
            {
                line = line
                    .words(", ")
                    .figure(format!("{} A", fixed(amperes, 1)), format!("{oil}/current_a"));
            }
            pairs.push(("heater".to_owned(), line));
        }
        if let Some((clock, days)) = self.advice.decision.choice.switch_on {
            let day = match days {
                0 => " the same morning".to_owned(),
                1 => " the day before".to_owned(),
                more => format!(" {more} days before"),
            };
            let mut line =
                Line::new().figure(clock.to_string(), "/choice/switch_on/clock").words(day);
            line = line.words(format!(", for the shift at {}", self.case.duty.shift_start));
            if let Some(valid) =
                found.heating.gate_valid_s.filter(|_| plan.kind != PlanKind::BlanketAndHold)
            {
                line = line
                    .words("; start within ")
                    .figure(self.shown.time(valid), format!("{oil}/gate_valid_s"))
                    .words(" of unplugging");
            }
            pairs.push(("switch on".to_owned(), line));
        }
    }

    fn why(&self, blocks: &mut Vec<Block>) {
        let decision = &self.advice.decision;
        let mut lines: Vec<Line> = decision
            .choice
            .why
            .iter()
            .enumerate()
            .map(|(row, why)| Line::new().say(&why.text, &format!("/choice/why/{row}"), self.shown))
            .collect();
        if let Some((at, _, found)) = self.focus() {
            lines.extend(found.reasons.iter().enumerate().map(|(row, reason)| {
                Line::new().say(&reason.text, &format!("/oils/{at}/reasons/{row}"), self.shown)
            }));
        }
        if !lines.is_empty() {
            blocks.push(Block::Heading(Line::from("Why")));
            blocks.push(Block::List(lines));
        }
    }

    fn cold(&self, blocks: &mut Vec<Block>) {
        let cold = &self.advice.cold;
        blocks.push(Block::Heading(Line::from("How cold that is")));
        let mut lines = vec![Line::new().say(&cold.which, "/cold", self.shown)];
        if let (Some(one), Some(ten)) = (cold.chance_a_winter, cold.chance_ten_winters) {
            lines.push(
                Line::from("colder than that: ")
                    .figure(chance(one), "/cold/chance_a_winter")
                    .words(" of winters, ")
                    .figure(chance(ten), "/cold/chance_ten_winters")
                    .words(" that it happens in ten"),
            );
        } else if let Some(why) = cold.why {
            lines.push(Line::from(format!("how often it is colder is not known: {why}")));
        }
        if let Some(timing) = cold.timing {
            let mut line = Line::from("switched on ")
                .figure(self.shown.time(timing.latest_s), "/choice/timing/latest_s")
                .words(" before the shift");
            if let Some(high) = timing.latest_high_s {
                line = line
                    .words(" (")
                    .figure(self.shown.time(high), "/choice/timing/latest_high_s")
                    .words(" if the tank loses more)");
            }
            lines.push(
                line.words(" it takes ")
                    .figure(energy(timing.last_minute_kwh), "/choice/timing/last_minute_kwh")
                    .words("; held warm all night ")
                    .figure(energy(timing.hold_kwh), "/choice/timing/hold_kwh"),
            );
        }
        blocks.push(Block::List(lines));
        if !cold.against.is_empty() {
            let rows = cold
                .against
                .iter()
                .enumerate()
                .map(|(at, one)| {
                    let base = format!("/cold/against/{at}");
                    vec![
                        Line::from(one.wish.to_string()),
                        Line::new().figure(
                            self.shown.temperature(one.celsius),
                            format!("{base}/temperature_c"),
                        ),
                        Line::from(if one.holds { "holds" } else { "NOT" }),
                        Line::new().say(&one.text, &base, self.shown),
                    ]
                })
                .collect();
            blocks.push(Block::Table {
                head: ["the site's", "cold", "the plan", "why"].map(str::to_owned).to_vec(),
                rows,
            });
        }
    }

    fn winter(&self, blocks: &mut Vec<Block>) {
        let decision = &self.advice.decision;
        let rows: Vec<Vec<Line>> = decision
            .plans
            .iter()
            .zip(&self.advice.cold.winter)
            .enumerate()
            .filter(|(_, (plan, _))| plan.allowed)
            .filter_map(|(at, (plan, winter))| {
                let winter = (*winter)?;
                let base = format!("/plans/{at}/winter");
                let cell = |value: Option<f64>, key: &str, decimals: usize| match value {
                    Some(value) => {
                        Line::new().figure(fixed(value, decimals), format!("{base}/{key}"))
                    }
                    None => Line::from("-"),
                };
                Some(vec![
                    Line::from(plan.kind.words()),
                    Line::from(self.case.oils.get(plan.oil).map_or("-", Oil::name)),
                    cell(Some(winter.mornings), "mornings", 0),
                    cell(winter.heater_hours, "heater_hours", 0),
                    cell(winter.energy_kwh, "energy_kwh", 0),
                    cell(winter.cost, "cost", 0),
                ])
            })
            .collect();
        if rows.is_empty() {
            return;
        }
        blocks.push(Block::Heading(Line::from("The winter ahead")));
        blocks.push(Block::Table {
            head: ["plan", "oil", "mornings too cold", "heater h", "kWh", "cost"]
                .map(str::to_owned)
                .to_vec(),
            rows,
        });
        let counted = self.advice.cold.winter.iter().flatten().all(|winter| winter.counted);
        blocks.push(Block::Text(Line::from(if counted {
            "A usual year by the counts of the climate file; mornings on which the oil does not start without heat."
        } else {
            "A usual year from monthly means (Erbs): good for the bulk of the winter, not for its coldest days. Mornings on which the oil does not start without heat."
        })));
    }

    fn oils(&self, blocks: &mut Vec<Block>) {
        blocks.push(Block::Heading(Line::from("Oils")));
        let soak = self.advice.decision.oils.first().map_or(0.0, |found| found.soak_c);
        let rows = self
            .case
            .oils
            .iter()
            .zip(&self.advice.decision.oils)
            .enumerate()
            .map(|(at, (oil, found))| self.oil_row(at, oil, found))
            .collect();
        blocks.push(Block::Table {
            head: vec![
                "oil".to_owned(),
                format!("mm²/s at {}", self.shown.temperature(soak)),
                "turn from".to_owned(),
                "light from".to_owned(),
                "full from".to_owned(),
                "answer".to_owned(),
            ],
            rows,
        });
    }

    fn oil_row(&self, at: usize, oil: &Oil, found: &Assessment) -> Vec<Line> {
        let base = format!("/oils/{at}");
        let mut name = oil.name().to_owned();
        if self.advice.decision.in_service == Some(at) && !name.contains("in service") {
            name.push_str(" (now)");
        }
        if oil.reference_only() {
            name.push_str(" (compare)");
        }
        let viscosity = match (found.at_soak.expected, found.at_soak.high) {
            (Some(expected), Some(high)) => Line::new()
                .figure(
                    number(self.shown, expected),
                    format!("{base}/viscosity_at_soak/expected_mm2_s"),
                )
                .words(" to ")
                .figure(number(self.shown, high), format!("{base}/viscosity_at_soak/high_mm2_s")),
            _ => Line::from("sets"),
        };
        let cell = |floor: &Floor, key: &str| match floor.at_c {
            Some(t) => Line::new().figure(self.shown.temperature(t), format!("{base}/{key}")),
            None => Line::from("never"),
        };
        vec![
            Line::from(name),
            viscosity,
            cell(&found.start_floor, "start_floor_c"),
            cell(&found.light_floor, "light_floor_c"),
            cell(&found.work_floor, "work_floor_c"),
            Line::from(verdict_words(found.verdict)),
        ]
    }

    fn plans(&self, blocks: &mut Vec<Block>) {
        let decision = &self.advice.decision;
        blocks.push(Block::Heading(Line::from("Plans side by side")));
        let many = decision.plans.len() > PLANS_SHOWN;
        let shown: Vec<(usize, &Plan)> = decision
            .plans
            .iter()
            .enumerate()
            .filter(|(at, plan)| {
                !many
                    || plan.allowed
                    || Some(plan.oil) == decision.in_service
                    || Some(*at) == decision.choice.plan
                    || !plan.kind.starts()
            })
            .collect();
        let left_out = decision.plans.len() - shown.len();
        let rows = shown.into_iter().map(|(at, plan)| self.plan_row(at, plan)).collect();
        blocks.push(Block::Table {
            head: ["plan", "oil", "heater", "hold", "energy", "ready in", "may it"]
                .map(str::to_owned)
                .to_vec(),
            rows,
        });
        let mut notes = vec![];
        for (at, plan) in decision.plans.iter().enumerate() {
            let ours = Some(plan.oil) == decision.in_service || !plan.kind.starts();
            if plan.allowed || plan.why.is_empty() || !ours {
                continue;
            }
            let mut line = Line::from(format!("{}: ", plan.kind.words()));
            for (row, why) in plan.why.iter().enumerate() {
                if row > 0 {
                    line = line.words("; ");
                }
                line = line.say(&why.text, &format!("/plans/{at}/why/{row}"), self.shown);
            }
            notes.push(line);
        }
        if left_out > 0 {
            notes.push(Line::from(format!(
                "{left_out} plans that are not allowed are left out here; the JSON has them with the reason"
            )));
        }
        if !notes.is_empty() {
            blocks.push(Block::List(notes));
        }
    }

    fn plan_row(&self, at: usize, plan: &Plan) -> Vec<Line> {
        let base = format!("/plans/{at}");
        let figure = |value: Option<f64>, key: &str, text: &dyn Fn(f64) -> String| match value {
            Some(value) => Line::new().figure(text(value), format!("{base}/{key}")),
            None => Line::from("-"),
        };
        let chosen = self.advice.decision.choice.plan == Some(at);
        let answer = match (chosen, plan.allowed) {
            (true, _) => "CHOSEN",
            (false, true) => "yes",
            (false, false) => "no",
        };
        vec![
            Line::from(plan.kind.words()),
            Line::from(self.case.oils.get(plan.oil).map_or("-", Oil::name)),
            figure(plan.heater_w, "heater_w", &|v| self.shown.power(v)),
            figure(plan.hold_w, "hold_w", &|v| self.shown.power(v)),
            figure(plan.energy_kwh, "energy_kwh", &energy),
            figure(plan.ready_s, "ready_s", &|v| {
                if v <= 0.0 { "at once".to_owned() } else { self.shown.time(v) }
            }),
            Line::from(answer),
        ]
    }

    fn ask_for(&self, blocks: &mut Vec<Block>) {
        let ask = &self.advice.ask_for;
        blocks.push(Block::Heading(Line::from("The oil to ask any supplier for")));
        let mut line = Line::from("To start this machine cold here: pour point ")
            .figure(self.shown.temperature(ask.pour_point_max_c), "/ask_for/pour_point_max_c")
            .words(" or colder");
        if let Some(most) = ask.viscosity_max {
            line = line
                .words("; at most ")
                .figure(self.shown.viscosity(most), "/ask_for/viscosity_max_mm2_s")
                .words(" at ")
                .figure(self.shown.temperature(ask.at_c), "/ask_for/at_c");
        }
        line = line
            .words("; at least ")
            .figure(self.shown.viscosity(ask.viscosity_min), "/ask_for/viscosity_min_mm2_s")
            .words(" at ")
            .figure(self.shown.temperature(ask.at_max_c), "/ask_for/at_max_c")
            .words(" after shear in service.");
        if let Some(why) = ask.why {
            line = line.words(format!(" {}.", capital(why)));
        } else {
            line = line.words(" Grades that can meet it: ");
            for (row, (grade, index)) in ask.grades.iter().enumerate() {
                if row > 0 {
                    line = line.words(", ");
                }
                line = line
                    .words("ISO VG ")
                    .figure(grade.to_string(), format!("/ask_for/grades/{row}/iso_vg"))
                    .words(" with a viscosity index of ")
                    .figure(fixed(*index, 0), format!("/ask_for/grades/{row}/viscosity_index_min"))
                    .words(" or more");
            }
            if ask.pour_point_max_c <= LOW_POUR_C {
                line = line.words(": synthetic or low-pour oils");
            }
            line = line.words(
                ". Ask for the cold viscosity measured (ASTM D2983 or D445), not calculated.",
            );
        }
        blocks.push(Block::Text(line));
    }

    fn procedure(&self, blocks: &mut Vec<Block>) {
        blocks.push(Block::Heading(Line::from("Procedure")));
        let mut phase: Option<Phase> = None;
        let mut steps: Vec<(usize, Vec<Line>)> = Vec::new();
        for (at, step) in self.advice.procedure.iter().enumerate() {
            if phase != Some(step.phase) {
                if !steps.is_empty() {
                    blocks.push(Block::Steps(std::mem::take(&mut steps)));
                }
                blocks.push(Block::Subheading(Line::from(step.phase.words())));
                phase = Some(step.phase);
            }
            steps.push((at + 1, self.step(at, step)));
        }
        if !steps.is_empty() {
            blocks.push(Block::Steps(steps));
        }
    }

    fn step(&self, at: usize, step: &Step) -> Vec<Line> {
        let base = format!("/procedure/{at}");
        let mut lines = vec![Line::new().say(&step.text, &base, self.shown)];
        if let Some(gate) = step.gate {
            lines.push(self.gate(gate, &format!("{base}/gate")));
        }
        if !step.stop_if.is_empty() {
            let mut line = Line::new().strong("STOP if ");
            for (row, stop) in step.stop_if.iter().enumerate() {
                if row > 0 {
                    line = line.words("; ");
                }
                line = line.say(stop, &base, self.shown);
            }
            lines.push(line.words("."));
        }
        if !step.cautions.is_empty() {
            lines.push(Line::new().faint(format!("cautions: {}", step.cautions.join(", "))));
        }
        lines
    }

    fn gate(&self, gate: Gate, base: &str) -> Line {
        let reading = match gate.reading {
            Reading::OilAtSuction => "oil at the suction",
            Reading::InletVacuum => "vacuum at the inlet",
            Reading::PumpSpeed => "pump speed",
            Reading::PumpBody => "oil over the pump body",
            Reading::Time => "time",
        };
        let line = Line::new().strong("GO ON WHEN ").words(format!("{reading}: "));
        match gate.bound {
            Bound::AtLeastC(v) => line
                .figure(self.shown.temperature(v), format!("{base}/at_least_c"))
                .words(" or warmer"),
            Bound::AtMostK(v) => {
                line.words("at most ").figure(self.shown.difference(v), format!("{base}/at_most_k"))
            }
            Bound::AtMostKpa(v) => {
                line.words("at most ").figure(self.shown.vacuum(v), format!("{base}/at_most_kpa"))
            }
            Bound::AtMostRpm(v) => line
                .words("at most ")
                .figure(format!("{} rpm", fixed(v, 0)), format!("{base}/at_most_rpm")),
            Bound::AtLeastS(v) => {
                line.words("at least ").figure(self.shown.time(v), format!("{base}/at_least_s"))
            }
        }
    }

    fn cautions(&self, blocks: &mut Vec<Block>) {
        blocks.push(Block::Heading(Line::from("Cautions")));
        let lines = self
            .advice
            .cautions
            .iter()
            .enumerate()
            .map(|(at, caution)| {
                Line::new()
                    .strong(format!("{} {}: ", caution.row.signal().id(), caution.row.id))
                    .words(format!("{} (", caution.row.text))
                    .say(&caution.because, &format!("/cautions/{at}"), self.shown)
                    .words(")")
            })
            .collect();
        blocks.push(Block::List(lines));
    }

    fn confirm(&self, blocks: &mut Vec<Block>) {
        super::assessment::policy(blocks, self.case, self.shown);
        if self.advice.confirm.is_empty() {
            return;
        }
        blocks.push(Block::Heading(Line::from("Assumed - confirm")));
        let lines =
            self.advice.confirm.iter().enumerate().map(|(at, one)| self.assumed(at, one)).collect();
        blocks.push(Block::List(lines));
    }

    fn assumed(&self, at: usize, confirm: &Confirm) -> Line {
        let one = &confirm.assumption;
        let base = format!("/assumptions/{at}");
        let mut line = Line::from(format!("{}: ", one.key))
            .figure(self.shown.input(&one.key, &one.value), format!("{base}/value"));
        if confirm.governs {
            line = line.strong(", a floor hangs on it");
        }
        if let Some(range) = &confirm.range {
            let moves = |ends: [Option<f64>; 2]| match ends {
                [Some(one), Some(other)] => (one - other).abs() > 0.05,
                [one, other] => one.is_some() != other.is_some(),
            };
            let floors = [
                ("turn", "start_floor", range.start_floor_c),
                ("full load", "work_floor", range.work_floor_c),
            ];
            for (name, key, ends) in floors {
                if !moves(ends) {
                    continue;
                }
                let end = |line: Line, t: Option<f64>, end: &str| match t {
                    Some(t) => {
                        line.figure(self.shown.temperature(t), format!("{base}/range/{key}/{end}"))
                    }
                    None => line.words("never"),
                };
                line = end(line.words(format!("; {name} from ")), ends[0], "from_c")
                    .words(" with ")
                    .figure(self.shown.input(&one.key, &range.from), format!("{base}/range/from"))
                    .words(", ");
                line = end(line, ends[1], "to_c")
                    .words(" with ")
                    .figure(self.shown.input(&one.key, &range.to), format!("{base}/range/to"));
            }
        }
        let find =
            if one.ask.is_empty() { String::new() } else { format!("; find it: {}", one.ask) };
        line.faint(format!(" [{}{find}]", one.source))
    }

    fn levers(&self, blocks: &mut Vec<Block>) {
        if self.advice.levers.is_empty() {
            return;
        }
        blocks.push(Block::Heading(Line::from("What would help")));
        let lines = self
            .advice
            .levers
            .iter()
            .take(LEVERS_SHOWN)
            .enumerate()
            .map(|(at, lever)| self.lever(at, lever))
            .collect();
        blocks.push(Block::List(lines));
        let more = self.advice.levers.len().saturating_sub(LEVERS_SHOWN);
        if more > 0 {
            blocks.push(Block::Text(Line::from(format!("{more} more in the JSON."))));
        }
    }

    fn lever(&self, at: usize, lever: &Lever) -> Line {
        let base = format!("/levers/{at}");
        let mut line = Line::new().say(&lever.text, &base, self.shown).words(": turn from ");
        let Some(found) = lever.found() else { return line };
        line = match found.start_floor.at_c {
            Some(t) => line.figure(self.shown.temperature(t), format!("{base}/start_floor_c")),
            None => line.words("never"),
        };
        line = line.words(", full load from ");
        line = match found.work_floor.at_c {
            Some(t) => line.figure(self.shown.temperature(t), format!("{base}/work_floor_c")),
            None => line.words("never"),
        };
        line = match (found.heating.status, found.heating.heater_w) {
            (HeatingStatus::Sized, Some(watts)) => {
                let line = line
                    .words(", heater ")
                    .figure(self.shown.power(watts), format!("{base}/heater_w"));
                match found.heating.needed_w {
                    Some(needed) => line
                        .words(" for ")
                        .figure(self.shown.power(needed), format!("{base}/needed_w")),
                    None => line,
                }
            }
            (HeatingStatus::NotNeeded, _) => line.words(", no heater"),
            _ => line.words(", no heater does it"),
        };
        let set: Vec<String> = lever
            .edits
            .iter()
            .map(|edit| format!("--set \"{}={}\"", edit.key, edit.value))
            .collect();
        line.faint(format!(" [{}]", set.join(" ")))
    }

    /// Method, source and reach of the figures that were asked for most.
    fn reached(&self, blocks: &mut Vec<Block>) {
        let Some((at, ..)) = self.focus() else { return };
        blocks.push(Block::Heading(Line::from("How the numbers were reached")));
        let keys = [
            ("viscosity at the soak", "viscosity_at_soak/high_mm2_s"),
            ("turn from", "start_floor_c"),
            ("light from", "light_floor_c"),
            ("full from", "work_floor_c"),
            ("not above", "hot_ceiling_c"),
            ("power needed", "heating/needed_w"),
            ("heat loss", "heating/u_value_w_m2_k"),
            ("target", "heating/mean_target_c"),
            ("watt density", "heating/watt_density_max_w_cm2"),
            ("vacuum", "first_turn/vacuum_at_gate_kpa"),
            ("cold hose", "first_turn/hose_clearing_s"),
            ("circulation", "circulation/steady_c"),
        ];
        let pairs: Vec<(String, Line)> = keys
            .iter()
            .filter_map(|(name, key)| {
                let pointer = format!("/oils/{at}/{key}");
                let one = self.advice.evidence.iter().find(|one| one.at == pointer)?;
                Some((
                    (*name).to_owned(),
                    Line::from(one.method.name)
                        .faint(format!("; {}", one.method.source))
                        .words(format!(" ({})", one.reach)),
                ))
            })
            .collect();
        blocks.push(Block::Pairs(pairs));
        blocks.push(Block::Text(Line::from(
            "Every number of the JSON has such an entry. Floors are judged on the thick edge of the likely viscosity, the hot side on the thin one; the rates of that edge are this project's judgement until a viscosity measured in the cold replaces them.",
        )));
    }

    fn record(&self, blocks: &mut Vec<Block>) {
        if self.advice.decision.chosen().is_none() {
            return;
        }
        blocks.push(Block::Heading(Line::from("Record sheet, one a cold morning")));
        let rows: Vec<(String, Line)> = self
            .advice
            .record
            .iter()
            .map(|what| ((*what).to_owned(), Line::from("____________________")))
            .collect();
        blocks.push(Block::Pairs(rows));
    }
}

fn name_of(oil: &Oil) -> String {
    match oil.class() {
        Some(class) if class != oil.name() => format!("{} ({class})", oil.name()),
        _ => oil.name().to_owned(),
    }
}

fn number(shown: Shown, mm2_s: f64) -> String {
    shown.viscosity(mm2_s).replace(" mm²/s", "")
}

/// A chance as people say it.
fn chance(share: f64) -> String {
    let percent = 100.0 * share;
    if percent < 1.0 {
        "under 1 %".to_owned()
    } else if percent > 99.0 {
        "over 99 %".to_owned()
    } else {
        format!("{} %", fixed(percent, 0))
    }
}

fn capital(text: &str) -> String {
    let mut letters = text.chars();
    letters.next().map_or_else(String::new, |first| {
        first.to_uppercase().collect::<String>() + letters.as_str()
    })
}

const fn verdict_words(verdict: Verdict) -> &'static str {
    match verdict {
        Verdict::StartsCold => "starts cold",
        Verdict::StartsColdInletUnproven => "inlet unproven",
        Verdict::NeedsHeat => "heat tank",
        Verdict::NeedsWholeMachineHeat => "warm it all",
        Verdict::NotSuited => "not suited",
    }
}

const fn limit_words(id: LimitId) -> &'static str {
    match id {
        LimitId::PourMargin => "pour point and margin",
        LimitId::ViscosityStart => "start viscosity",
        LimitId::InletPressureStart => "inlet pressure at start speed",
        LimitId::ViscosityWork => "work viscosity",
        LimitId::InletPressureLight => "inlet pressure at light work",
        LimitId::InletPressureWork => "inlet pressure at work speed",
        LimitId::ViscosityMin => "least viscosity",
        LimitId::LineFlow => "flow in hoses",
    }
}
