//! What changed between the advice for two cases, and which inputs differ.

use super::document::{Block, Document, Line};
use super::units::{Shown, energy};
use crate::advice::{Advice, Assessment};
use crate::case::{Case, Units};
use crate::oil::Oil;
use std::collections::BTreeMap;

/// The differences, first against second.
#[must_use]
pub fn compare(one: (&Case, &Advice), other: (&Case, &Advice), units: Units) -> Document {
    let shown = Shown(units);
    let mut rows = Vec::new();
    let mut row = |name: String, a: String, b: String| {
        if a != b {
            rows.push(vec![Line::from(name), Line::from(a), Line::from(b)]);
        }
    };
    let (a, b) = (choice(one.0, one.1, shown), choice(other.0, other.1, shown));
    for ((name, a), (_, b)) in a.into_iter().zip(b) {
        row(name.to_owned(), a, b);
    }
    let find = |case: &Case, advice: &Advice, name: &str| -> Option<Vec<(&'static str, String)>> {
        let at = case.oils.iter().position(|oil| oil.name() == name)?;
        advice.decision.oils.get(at).map(|found| figures(found, shown))
    };
    let mut names: Vec<&str> = one.0.oils.iter().map(Oil::name).collect();
    names.extend(
        other
            .0
            .oils
            .iter()
            .map(Oil::name)
            .filter(|name| one.0.oils.iter().all(|oil| oil.name() != *name)),
    );
    for name in names {
        match (find(one.0, one.1, name), find(other.0, other.1, name)) {
            (Some(a), Some(b)) => {
                for ((figure, a), (_, b)) in a.into_iter().zip(b) {
                    row(format!("{name}: {figure}"), a, b);
                }
            }
            (Some(_), None) => row(name.to_owned(), "there".to_owned(), "not there".to_owned()),
            _ => row(name.to_owned(), "not there".to_owned(), "there".to_owned()),
        }
    }
    let ids = |advice: &Advice| -> Vec<String> {
        advice.cautions.iter().map(|caution| caution.row.id.clone()).collect()
    };
    let (a, b) = (ids(one.1), ids(other.1));
    let only = |these: &[String], those: &[String]| {
        these.iter().filter(|id| !those.contains(id)).cloned().collect::<Vec<_>>().join(", ")
    };
    row("cautions only here".to_owned(), only(&a, &b), only(&b, &a));
    let inputs = |case: &Case| -> BTreeMap<String, String> {
        case.inputs.iter().map(|input| (input.key.clone(), input.value.clone())).collect()
    };
    let (a, b) = (inputs(one.0), inputs(other.0));
    let keys: std::collections::BTreeSet<&String> = a.keys().chain(b.keys()).collect();
    let because: Vec<Vec<Line>> = keys
        .into_iter()
        .filter(|key| a.get(*key) != b.get(*key))
        .map(|key| {
            let text = |side: &BTreeMap<String, String>| {
                Line::from(side.get(key).cloned().unwrap_or_else(|| "-".to_owned()))
            };
            vec![Line::from(key.clone()), text(&a), text(&b)]
        })
        .collect();
    let mut blocks =
        vec![Block::Title(Line::from(format!("{} against {}", one.0.title, other.0.title)))];
    let head = |name: &str| [name, "first", "second"].map(str::to_owned).to_vec();
    blocks.push(Block::Heading(Line::from("What changed in the advice")));
    if rows.is_empty() {
        blocks.push(Block::Text(Line::from("Nothing.")));
    } else {
        blocks.push(Block::Table { head: head("figure"), rows });
    }
    blocks.push(Block::Heading(Line::from("What differs in the cases")));
    if because.is_empty() {
        blocks.push(Block::Text(Line::from("Nothing.")));
    } else {
        blocks.push(Block::Table { head: head("key"), rows: because });
    }
    Document { blocks }
}

fn choice(case: &Case, advice: &Advice, shown: Shown) -> Vec<(&'static str, String)> {
    let plan = advice.decision.chosen();
    let none = || "-".to_owned();
    vec![
        ("plan", plan.map_or_else(|| "none allowed".to_owned(), |p| p.kind.words().to_owned())),
        (
            "on",
            plan.and_then(|p| case.oils.get(p.oil)).map_or_else(none, |oil| oil.name().to_owned()),
        ),
        ("heater", plan.and_then(|p| p.heater_w).map_or_else(none, |w| shown.power(w))),
        ("energy a start", plan.and_then(|p| p.energy_kwh).map_or_else(none, energy)),
        (
            "switch on",
            advice.decision.choice.switch_on.map_or_else(none, |(clock, days)| {
                format!("{clock}{}", if days > 0 { " day before" } else { "" })
            }),
        ),
    ]
}

fn figures(found: &Assessment, shown: Shown) -> Vec<(&'static str, String)> {
    let t = |t: Option<f64>| t.map_or_else(|| "never".to_owned(), |t| shown.temperature(t));
    vec![
        ("answer", found.verdict.words().to_owned()),
        ("turn from", t(found.start_floor.at_c)),
        ("set by", found.start_floor.set_by.map_or("-", |by| by.id()).to_owned()),
        ("light from", t(found.light_floor.at_c)),
        ("full from", t(found.work_floor.at_c)),
        ("not above", t(found.hot_ceiling_c)),
        ("power needed", found.heating.needed_w.map_or_else(|| "-".to_owned(), |w| shown.power(w))),
    ]
}
