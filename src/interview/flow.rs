//! The run of the questions: what comes next, going back, changing an answer, leaving off.

use super::ask::{Ask, Prompt, Reply, Stop};
use super::draft::Draft;
use super::hose::bore_of;
use super::known;
use super::question::{OIL_QUESTIONS, QUESTIONS, Question, Section};
use crate::case::keys::{self, Key, KeyKind, Need};
use crate::case::{Case, CaseFile, Faults};
use crate::climate::Sites;
use crate::quantity::{AbsolutePressure, Bore, Flow, Rotation, Temperature, ViscosityReading};

/// How much is asked.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Length {
    /// About fifteen questions; all else is typical and listed as assumed.
    Quick,
    /// Everything.
    Full,
}

/// No more oils than these are asked for.
const MOST_OILS: usize = 6;

/// One question that is to be put.
struct Item {
    id: String,
    section: Section,
    /// `None`: whether to skip the section.
    question: Option<&'static Question>,
    /// The case key it sets, where it is one.
    key: Option<String>,
}

/// Puts the questions that are not answered yet, then offers to change any; `save` is called with
/// all answers after each.
///
/// # Errors
/// Whoever answers stops, or saving fails.
pub fn interview(
    ask: &mut dyn Ask,
    base: &CaseFile,
    draft: &mut Draft,
    length: Length,
    sites: &dyn Sites,
    save: &mut dyn FnMut(&Draft) -> Result<(), String>,
) -> Result<CaseFile, Stop> {
    let desk = Desk { base, length, sites };
    let mut visited: Vec<String> = draft.answers().map(|(id, _)| id.to_owned()).collect();
    let mut again: Option<String> = None;
    let mut section = None;
    loop {
        let items = desk.items(draft);
        let item = match &again {
            Some(id) => items.into_iter().find(|item| item.id == *id),
            None => items.into_iter().find(|item| draft.get(&item.id).is_none()),
        };
        let Some(item) = item else {
            if again.take().is_some() {
                continue;
            }
            desk.summary(ask, draft, section);
            match desk.review(ask, draft)? {
                None => return desk.build(draft).map_err(|fault| Stop::Script(fault.to_string())),
                Some(id) => {
                    section = None;
                    again = Some(id);
                    continue;
                }
            }
        };
        if section != Some(item.section) {
            desk.summary(ask, draft, section);
            ask.say(&format!("\n{}. {}", item.section.title(), item.section.why()));
            section = Some(item.section);
        }
        match desk.put(ask, draft, &item)? {
            Reply::Back => match visited.pop() {
                Some(id) => {
                    again = Some(id);
                    // The section is announced anew only where it changes.
                }
                None => ask.say("This is the first question."),
            },
            Reply::Text(text) => {
                draft.set(&item.id, &text);
                if let Some(echo) = desk.echo(&item, &text) {
                    ask.say(&echo);
                }
                visited.retain(|id| *id != item.id);
                visited.push(item.id.clone());
                again = None;
                for (id, text) in desk.unwanted(draft) {
                    ask.say(&format!("no longer asked, dropped: {id} ({text})"));
                    draft.remove(&id);
                    visited.retain(|other| *other != id);
                }
                save(draft).map_err(Stop::Io)?;
            }
        }
    }
}

struct Desk<'a> {
    base: &'a CaseFile,
    length: Length,
    sites: &'a dyn Sites,
}

impl Desk<'_> {
    /// Every question these answers ask for, in order.
    fn items(&self, draft: &Draft) -> Vec<Item> {
        let quick = self.length == Length::Quick;
        let mut items = Vec::new();
        for section in Section::ALL {
            if !quick && section.skipped().is_some() {
                let id = format!("skip.{}", section.title());
                let skipped = draft.get(&id) == Some("skip");
                items.push(Item { id, section: *section, question: None, key: None });
                if skipped {
                    continue;
                }
            }
            if *section == Section::Oils {
                oils(draft, quick, &mut items);
                continue;
            }
            for question in QUESTIONS.iter().filter(|question| question.section == *section) {
                if (quick && !question.quick) || !(question.when)(draft, quick) {
                    continue;
                }
                items.push(Item {
                    id: question.id.to_owned(),
                    section: *section,
                    question: Some(question),
                    key: keys::find(question.id).map(|key| key.path.to_owned()),
                });
            }
        }
        items
    }

    /// Answers that no question asks for any more.
    fn unwanted(&self, draft: &Draft) -> Vec<(String, String)> {
        let items = self.items(draft);
        draft
            .answers()
            .filter(|(id, _)| !items.iter().any(|item| item.id == *id))
            .map(|(id, text)| (id.to_owned(), text.to_owned()))
            .collect()
    }

    fn put(&self, ask: &mut dyn Ask, draft: &Draft, item: &Item) -> Result<Reply, Stop> {
        let Some(question) = item.question else {
            let lost = item.section.skipped().unwrap_or_default();
            let choices = [
                ("go".to_owned(), "answer these questions".to_owned()),
                ("skip".to_owned(), format!("skip them: {lost}")),
            ];
            return ask.ask(&Prompt {
                id: &item.id,
                text: &format!("{}: answer or skip?", item.section.title()),
                help: item.section.why(),
                default: draft.get(&item.id).or(Some("go")),
                choices: &choices,
                check: &|text| one_of(&choices, text),
            });
        };
        let key = item.key.as_deref().and_then(keys::find);
        let text = question.text.or(key.map(|key| key.question)).unwrap_or(question.id);
        let choices = self.choices(draft, item, question, key.as_ref());
        let help = self.help(draft, item, question, key.as_ref());
        let default = draft
            .get(&item.id)
            .map(str::to_owned)
            .or_else(|| item.key.as_deref().and_then(|key| self.base.get(key)).map(str::to_owned))
            .or_else(|| (item.id == "oil1.in_service").then(|| "true".to_owned()))
            .or_else(|| {
                choices.first().filter(|_| !question.choices.is_empty()).map(|(w, _)| w.clone())
            });
        ask.ask(&Prompt {
            id: &item.id,
            text,
            help: &help,
            default: default.as_deref(),
            choices: &choices,
            check: &|text| {
                if choices.is_empty() {
                    self.check(draft, item, text)
                } else {
                    one_of(&choices, text)
                }
            },
        })
    }

    fn choices(
        &self,
        draft: &Draft,
        item: &Item,
        question: &Question,
        key: Option<&Key>,
    ) -> Vec<(String, String)> {
        if !question.choices.is_empty() {
            let own = |(word, text): &(&str, &str)| ((*word).to_owned(), (*text).to_owned());
            return question.choices.iter().map(own).collect();
        }
        let Some(key) = key else { return Vec::new() };
        let mut choices: Vec<(String, String)> = match key.kind {
            KeyKind::Choice(words) => {
                words.iter().map(|word| ((*word).to_owned(), word.replace('-', " "))).collect()
            }
            KeyKind::Switch => {
                vec![("false".to_owned(), "no".to_owned()), ("true".to_owned(), "yes".to_owned())]
            }
            _ => return Vec::new(),
        };
        if key.need != Need::Required {
            let typical = self.typical(draft, item).unwrap_or_else(|| "left out".to_owned());
            choices.push(("?".to_owned(), format!("I don't know: {typical}")));
        }
        choices
    }

    fn help(&self, draft: &Draft, item: &Item, question: &Question, key: Option<&Key>) -> String {
        let mut help = question.help.or(key.map(|key| key.find)).unwrap_or_default().to_owned();
        let us = draft.get("units") == Some("us");
        let example = question
            .us
            .filter(|_| us)
            .map(str::to_owned)
            .or_else(|| key.map(|key| key.example.trim_matches('"').to_owned()))
            .filter(|_| question.choices.is_empty());
        if let Some(example) = example.filter(|example| !example.starts_with('{')) {
            help.push_str(&format!("; for example `{example}`"));
        }
        let unknown = key.is_none_or(|key| key.need != Need::Required);
        if unknown && question.choices.is_empty() {
            match self.typical(draft, item) {
                Some(typical) => help.push_str(&format!("; `?` I don't know: {typical}")),
                None => help.push_str("; `?` I don't know"),
            }
        }
        help
    }

    /// What "I don't know" comes to, with its source.
    fn typical(&self, draft: &Draft, item: &Item) -> Option<String> {
        let key = item.key.as_deref()?;
        let mut without = draft.clone();
        without.set(&item.id, "?");
        let case = self.preview(&without)?;
        let assumed = case.assumptions.iter().find(|one| one.key == key)?;
        Some(format!("{} ({})", assumed.value, assumed.source))
    }

    /// The case so far, with what is required and not yet answered filled in for a look ahead.
    fn preview(&self, draft: &Draft) -> Option<Case> {
        let mut file = self.build(draft).ok()?;
        for (key, text) in [
            ("site.minimum_temperature", "-20 °C"),
            ("pump.kind", "axial-piston"),
            ("reservoir.oil_volume", "200 L"),
            ("duty.time_to_warm", "4 h"),
        ] {
            let climate = key.starts_with("site") && file.get("site.climate").is_some();
            if file.get(key).is_none() && !climate {
                file.set(key, text).ok()?;
            }
        }
        file.check_in(self.sites).ok()
    }

    /// Checks one answer as the case file would.
    fn check(&self, draft: &Draft, item: &Item, text: &str) -> Result<(), String> {
        let text = text.trim();
        let required =
            item.key.as_deref().and_then(keys::find).is_some_and(|k| k.need == Need::Required);
        if matches!(text, "" | "?" | "none") {
            return if required {
                Err("is needed: without it there is no advice".to_owned())
            } else {
                Ok(())
            };
        }
        traps(&item.id, text)?;
        let name = item.id.split_once('.').map_or(item.id.as_str(), |(_, name)| name);
        if item.id.starts_with("oil") && (name == "viscosity.40 °C" || name == "viscosity.100 °F")
        {
            return text.parse::<ViscosityReading>().map(|_| ()).map_err(|e| e.to_string());
        }
        let mut tried = draft.clone();
        tried.set(&item.id, text);
        let file = self.build(&tried).map_err(|fault| fault.to_string())?;
        let Err(Faults(faults)) = file.check_in(self.sites) else { return Ok(()) };
        let keys = sets(&item.id);
        match faults.iter().find(|fault| keys.iter().any(|key| fault.key.starts_with(key.as_str())))
        {
            Some(fault) => Err(fault.message.clone()),
            None => Ok(()),
        }
    }

    /// The reading shown back, where it was typed in another unit.
    fn echo(&self, item: &Item, text: &str) -> Option<String> {
        let key = item.key.as_deref().and_then(keys::find)?;
        let KeyKind::Quantity(kind) = key.kind else {
            return match (key.kind, text.parse::<Temperature>()) {
                (KeyKind::Minimum, Ok(t)) if !text.ends_with("°C") => {
                    Some(format!("  {text} ({t})"))
                }
                _ => None,
            };
        };
        let value = kind.read(text).ok()?;
        let shown =
            format!("{} {}", crate::quantity::shown((value * 1e4).round() / 1e4), kind.unit);
        // The same number in the same unit, spelt otherwise, needs no echo.
        let typed: String = text
            .trim()
            .replace([',', '−'], ".")
            .chars()
            .take_while(|c| c.is_ascii_digit() || matches!(c, '-' | '+' | '.'))
            .collect();
        let same = typed.parse::<f64>().is_ok_and(|typed| (typed - value).abs() < 1e-9);
        (!same).then(|| format!("  {text} ({shown})"))
    }

    /// The case these answers make.
    fn build(&self, draft: &Draft) -> Result<CaseFile, crate::case::Fault> {
        let mut file = self.base.clone();
        if file.get("format").is_none() {
            file.set("format", "1")?;
        }
        for (id, text) in draft.answers() {
            apply(&mut file, draft, id, text.trim())?;
        }
        Ok(file)
    }

    /// What is known so far, after a section.
    fn summary(&self, ask: &mut dyn Ask, draft: &Draft, section: Option<Section>) {
        let Some(section) = section else { return };
        if draft.get("site.minimum_temperature").is_none() {
            return;
        }
        if let Some(case) = self.preview(draft) {
            for line in known::so_far(&case, section) {
                ask.say(&format!("  so far: {line}"));
            }
        }
    }

    /// Any answer may be changed at the end; `None`: all is well.
    fn review(&self, ask: &mut dyn Ask, draft: &Draft) -> Result<Option<String>, Stop> {
        let items = self.items(draft);
        let mut choices = vec![("done".to_owned(), "all is well: give the advice".to_owned())];
        for item in &items {
            if let (Some(question), Some(text)) = (item.question, draft.get(&item.id)) {
                let key = item.key.as_deref().and_then(keys::find);
                let words = question.text.or(key.map(|key| key.question)).unwrap_or(question.id);
                choices.push((item.id.clone(), format!("{words} {text}")));
            }
        }
        let reply = ask.ask(&Prompt {
            id: "review",
            text: "Is all that right, or change an answer?",
            help: "choose an answer to change it",
            default: Some("done"),
            choices: &choices,
            check: &|text| one_of(&choices, text),
        })?;
        Ok(match reply {
            Reply::Text(text) if text == "done" => None,
            Reply::Text(id) => Some(id),
            Reply::Back => draft.answers().last().map(|(id, _)| id.to_owned()),
        })
    }
}

/// The questions of the oils.
fn oils(draft: &Draft, quick: bool, items: &mut Vec<Item>) {
    for number in 1..=MOST_OILS {
        let prefix = format!("oil{number}.");
        let mut own = Draft::new();
        for (id, text) in draft.answers() {
            if let Some(name) = id.strip_prefix(&prefix) {
                own.set(name, text);
            }
        }
        for question in OIL_QUESTIONS {
            let asked =
                (!quick || question.quick || question.id == "more") && (question.when)(&own, quick);
            let last = question.id == "more" && number == MOST_OILS;
            if !asked || last || (quick && question.id == "more") {
                continue;
            }
            items.push(Item {
                id: format!("{prefix}{}", question.id),
                section: Section::Oils,
                question: Some(question),
                key: keys::find(&format!("oil.{}", question.id))
                    .map(|_| format!("oil[{number}].{}", question.id)),
            });
        }
        if own.get("more") != Some("yes") {
            return;
        }
    }
}

fn one_of(choices: &[(String, String)], text: &str) -> Result<(), String> {
    if choices.iter().any(|(word, _)| word == text) {
        return Ok(());
    }
    let words: Vec<&str> = choices.iter().map(|(word, _)| word.as_str()).collect();
    Err(format!("`{text}` is none of {}", words.join(", ")))
}

/// Answers that are asked back about instead of guessed.
fn traps(id: &str, text: &str) -> Result<(), String> {
    if id == "site.minimum_temperature" {
        if text.parse::<f64>().is_ok_and(|bare| bare >= 0.0) {
            return Err(format!(
                "`{text}` has no unit, and is it below zero? type `-{text} °C`, or `+{text} °C` if it is meant"
            ));
        }
        if let Ok(t) = text.parse::<Temperature>() {
            if t.as_celsius() >= 5.0 && !text.starts_with('+') {
                return Err(format!(
                    "{t} is warm for the coldest morning; type `-{text}`, or `+{text}` if it is meant"
                ));
            }
        }
    }
    if id.starts_with("pump.inlet_pressure") {
        let lower = text.to_lowercase();
        let said =
            ["psia", "abs", "vac", "kpa", "bar", "inhg"].iter().any(|word| lower.contains(word));
        if lower.contains("psi") && !said && text.parse::<AbsolutePressure>().is_ok() {
            return Err(format!(
                "is `{text}` absolute or under the air? type `{text}a`, or for example `12 inHg vacuum`"
            ));
        }
    }
    match id {
        "hose.outside" => outside(text).map(|_| ()),
        "pump.rated_flow" => displacement(text).map(|_| ()),
        _ => Ok(()),
    }
}

/// The case keys an answer sets, for finding its faults.
fn sets(id: &str) -> Vec<String> {
    match id {
        "hose.outside" => vec!["suction.bore".to_owned()],
        "hose.bends" | "hose.valve" => vec!["suction.fittings".to_owned()],
        "pump.rated_flow" => vec!["pump.displacement".to_owned()],
        _ => match oil_id(id) {
            Some((number, "cold_viscosity" | "viscosity_index")) => {
                vec![format!("oil[{number}].")]
            }
            Some((number, name)) if name.starts_with("viscosity.") => {
                vec![format!("oil[{number}].viscosity")]
            }
            Some((number, name)) => vec![format!("oil[{number}].{name}")],
            None => vec![id.to_owned()],
        },
    }
}

/// `oil2.class` as (2, "class").
fn oil_id(id: &str) -> Option<(usize, &str)> {
    let (number, name) = id.strip_prefix("oil")?.split_once('.')?;
    Some((number.parse().ok()?, name))
}

fn outside(text: &str) -> Result<f64, String> {
    let mm = text.parse::<Bore>().map_err(|error| error.to_string())?.as_mm();
    bore_of(mm).ok_or_else(|| {
        format!("no suction hose of {mm:.0} mm outside is in the table; give its bore in the full interview, or measure again")
    })
}

/// `150 L/min at 2000 rpm` in cm³.
fn displacement(text: &str) -> Result<f64, String> {
    let Some((flow, speed)) = text.split_once(" at ") else {
        return Err(format!("`{text}` has no ` at `; type for example `150 L/min at 2000 rpm`"));
    };
    let flow = flow.trim().parse::<Flow>().map_err(|error| error.to_string())?;
    let speed = speed.trim().parse::<Rotation>().map_err(|error| error.to_string())?;
    let cm3 = flow.as_litres_per_min() * 1000.0 / speed.as_rpm();
    if cm3.is_finite() && cm3 > 0.0 { Ok(cm3) } else { Err("the speed is 0 rpm".to_owned()) }
}

/// Sets what an answer says.
fn apply(
    file: &mut CaseFile,
    draft: &Draft,
    id: &str,
    text: &str,
) -> Result<(), crate::case::Fault> {
    let unknown = matches!(text, "" | "?" | "none");
    match id {
        "hose.outside" => {
            if let Ok(bore) = outside(text) {
                file.set("suction.bore", &format!("{bore} mm"))?;
            }
        }
        "pump.rated_flow" => {
            if let Ok(cm3) = displacement(text) {
                let shown = crate::quantity::shown((cm3 * 10.0).round() / 10.0);
                file.set("pump.displacement", &format!("{shown} cm³"))?;
            }
        }
        "hose.bends" => {
            let bends = match text {
                "one" => "1",
                "two" => "2",
                "three" => "3",
                _ => "none",
            };
            file.set("suction.fittings.elbow-90-long", bends)?;
        }
        "hose.valve" => {
            for valve in ["butterfly", "ball", "gate"] {
                let count = if valve == text { "1" } else { "none" };
                file.set(&format!("suction.fittings.{valve}"), count)?;
            }
        }
        "hose.strainer" => strainer(file, draft, text)?,
        _ if id.starts_with("skip.") => {}
        _ => match oil_id(id) {
            Some((number, name)) => oil(file, draft, (number, name), text)?,
            None if unknown => {
                if keys::find(id).is_some() && file.get(id).is_some() {
                    file.set(id, "none")?;
                }
            }
            None => {
                file.set(id, text)?;
            }
        },
    }
    Ok(())
}

/// A strainer whose data are not known: 2.5 kPa clean, twice that when old, at the flow at work and
/// 32 mm²/s; common practice, no source.
fn strainer(file: &mut CaseFile, draft: &Draft, text: &str) -> Result<(), crate::case::Fault> {
    let known = draft.get("suction.strainer.loss").is_some_and(|t| !matches!(t, "?" | "none" | ""));
    if text == "no" {
        return file.set("suction.strainer", "none");
    }
    if known {
        return Ok(());
    }
    let of = |key: &str| file.get(key).map(str::to_owned);
    let flow = of("pump.displacement")
        .and_then(|text| text.parse::<crate::quantity::Displacement>().ok())
        .map(|d| {
            let rpm = of("pump.work_speed")
                .and_then(|text| text.parse::<Rotation>().ok())
                .map_or(2000.0, Rotation::as_rpm);
            (d.as_cm3() * rpm / 1000.0).round()
        })
        .filter(|flow| *flow >= 1.0)
        .unwrap_or(150.0);
    let loss = if text == "clean" { "2.5 kPa" } else { "5 kPa" };
    file.set("suction.strainer.loss", loss)?;
    file.set("suction.strainer.at_flow", &format!("{flow} L/min"))?;
    file.set("suction.strainer.at_viscosity", "32 mm²/s")
}

fn oil(
    file: &mut CaseFile,
    draft: &Draft,
    (number, name): (usize, &str),
    text: &str,
) -> Result<(), crate::case::Fault> {
    let key = |name: &str| format!("oil[{number}].{name}");
    match name {
        "how" => {
            if text != "none" && number == 1 && draft.get("oil1.in_service").is_none() {
                file.set(&key("in_service"), "true")?;
                if file.get(&key("name")).is_none() {
                    file.set(&key("name"), "oil in service")?;
                }
            }
            Ok(())
        }
        "mixture" => {
            let class = match text {
                "22" => "HM 32",
                "32" => "HM 46",
                _ => "HM 68",
            };
            file.set(&key("name"), "unknown mixture")?;
            file.set(&key("class"), class)?;
            file.set(&key("pour_point"), "-15 °C")
        }
        "more" => Ok(()),
        "cold_viscosity" => match text.split_once('=') {
            Some((at, viscosity)) => {
                file.set(&key(&format!("cold_viscosity.{}", at.trim())), viscosity)
            }
            None => Ok(()),
        },
        _ if matches!(text, "" | "?" | "none") => Ok(()),
        _ => file.set(&key(name), text),
    }
}
