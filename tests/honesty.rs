//! Numerical honesty over the whole legal space: every key of the table drawn over its legal range
//! or near its example, any of them missing. No figure is NaN or infinite, a colder or narrower
//! case never gets an easier answer, and US units give the answer of metric ones.
//!
//! `CASES=1000000 cargo test --release --test honesty -- --nocapture` draws more; `SEED` others.
#![cfg(feature = "cli")]

use coldsump::advice::{self, Assessment, Decision, Figure, Outcome, Part};
use coldsump::case::keys::{self, Key, KeyKind};
use coldsump::case::{Case, CaseFile, Faults, POLICY};
use coldsump::quantity::{Kind, Quantity, Temperature};
use coldsump::report;
use std::collections::BTreeMap;
use std::sync::Mutex;
use std::sync::atomic::{AtomicU64, Ordering};

/// A seeded source of numbers between 0 and 1 (Lehmer 1951, multiplier of Park and Miller 1988).
struct Dice(u64);

impl Dice {
    /// One that starts far from its neighbours.
    fn seeded(seed: u64) -> Self {
        let mixed = (seed + 1).wrapping_mul(0x9E37_79B9_7F4A_7C15) >> 17;
        let mut dice = Self(mixed % 2_147_483_646 + 1);
        (0..4).for_each(|_| _ = dice.roll());
        dice
    }

    fn roll(&mut self) -> f64 {
        self.0 = self.0 * 48_271 % 2_147_483_647;
        self.0 as f64 / 2_147_483_647.0
    }

    fn between(&mut self, from: f64, to: f64) -> f64 {
        from + (to - from) * self.roll()
    }

    fn pick<T: Copy>(&mut self, of: &[T]) -> T {
        of[((self.roll() * of.len() as f64) as usize).min(of.len() - 1)]
    }

    fn maybe(&mut self, share: f64) -> bool {
        self.roll() < share
    }
}

/// A value over the whole range, evenly or evenly in its logarithm.
fn anywhere(dice: &mut Dice, least: f64, greatest: f64) -> f64 {
    if least > 0.0 {
        (dice.between(least.ln(), greatest.ln())).exp().clamp(least, greatest)
    } else {
        dice.between(least, greatest)
    }
}

fn quantity(dice: &mut Dice, kind: &Kind, example: &str, wild: bool) -> String {
    let value = if wild {
        anywhere(dice, kind.least, kind.greatest)
    } else {
        let usual = kind.read(example.trim_matches('"')).unwrap();
        let near = if kind.unit == "°C" {
            usual + dice.between(-25.0, 25.0)
        } else {
            usual * dice.between(-1.2, 1.2).exp()
        };
        near.clamp(kind.least, kind.greatest)
    };
    format!("{value} {}", kind.unit)
}

/// The text of a key, drawn; `None` for keys drawn elsewhere.
fn draw(dice: &mut Dice, key: &Key, wild: bool) -> Option<String> {
    Some(match key.kind {
        KeyKind::Quantity(kind) => quantity(dice, kind, key.example, wild),
        KeyKind::Minimum => format!("{} °C", dice.between(-60.0, 20.0)),
        KeyKind::Viscosity => format!("{} mm²/s", anywhere(dice, 1.0, 20_000.0)),
        KeyKind::Switch => dice.maybe(0.5).to_string(),
        KeyKind::Number(least, greatest) => dice.between(least, greatest).to_string(),
        KeyKind::Choice(words) => dice.pick(words).to_owned(),
        KeyKind::Clock => {
            format!("{:02.0}:{:02.0}", dice.between(0.0, 23.0), dice.between(0.0, 59.0))
        }
        KeyKind::Whole | KeyKind::Text | KeyKind::Powers => return None,
        KeyKind::ViscosityTable | KeyKind::FittingTable => return None,
    })
}

/// What a case file would hold: key and text, in the order set.
type Texts = Vec<(String, String)>;

fn random_texts(dice: &mut Dice) -> Texts {
    let mut texts = Texts::new();
    // Wild in one key, in all, or in none.
    let wild = dice.pick(&[0.0, 0.02, 0.02, 0.1, 1.0]);
    let sections = [
        "suction",
        "case_drain",
        "supply",
        "machine",
        "suction.strainer",
        "reservoir.cooldown",
        "reservoir.insulation",
        "machine.accumulator",
    ];
    let there: Vec<(&str, bool)> = sections.iter().map(|name| (*name, dice.maybe(0.6))).collect();
    for key in keys::all() {
        let path = key.path;
        if path.starts_with("oil.") || path.starts_with("policy.") || path == "site.climate" {
            continue;
        }
        if there.iter().any(|(name, there)| !there && path.starts_with(&format!("{name}."))) {
            continue;
        }
        let whole = there.iter().any(|(name, _)| path.starts_with(&format!("{name}.")));
        let share = match key.need {
            keys::Need::Required => 1.0,
            _ if whole => 0.95,
            keys::Need::Typical => 0.4,
            keys::Need::Optional => 0.5,
        };
        // Everything at once contradicts itself: what only a fitted element has, seldom.
        let share = if path.starts_with("element.") { share * 0.4 } else { share };
        if !dice.maybe(share) {
            continue;
        }
        let one_wild = dice.maybe(wild);
        if let Some(text) = draw(dice, &key, one_wild) {
            texts.push((path.to_owned(), text));
        }
    }
    if there[0].1 {
        texts.push((
            "suction.fittings.elbow-90-long".to_owned(),
            dice.pick(&["1", "2", "5"]).to_owned(),
        ));
    }
    if there[2].1 {
        texts.push(("supply.phases".to_owned(), dice.pick(&["1", "3"]).to_owned()));
    }
    for row in POLICY {
        if dice.maybe(0.005) {
            let unit = row.kind.map_or("", |kind| kind.unit);
            texts.push((
                row.path.to_owned(),
                format!("{} {unit}", dice.between(row.least, row.greatest)),
            ));
        }
    }
    for oil in 1..=dice.pick(&[1, 1, 2, 3]) {
        oil_texts(dice, &mut texts, oil, wild);
    }
    texts
}

fn oil_texts(dice: &mut Dice, texts: &mut Texts, number: usize, wild: f64) {
    let mut put = |key: &str, text: String| texts.push((format!("oil[{number}].{key}"), text));
    put("name", format!("oil {number}"));
    let one_wild = dice.maybe(wild);
    let kv40 = if one_wild { anywhere(dice, 1.5, 20_000.0) } else { anywhere(dice, 8.0, 120.0) };
    let steep = dice.between(3.2, 8.5);
    put("viscosity.40 °C", format!("{kv40} mm²/s"));
    if dice.maybe(0.5) {
        put("viscosity.100 °C", format!("{} mm²/s", 1.0 + kv40 / steep));
    } else {
        put(
            "viscosity_index",
            dice.between(if one_wild { -100.0 } else { 60.0 }, 220.0).to_string(),
        );
    }
    if dice.maybe(0.2) {
        let at = dice.between(-40.0, 10.0);
        put(
            &format!("cold_viscosity.{at} °C"),
            format!("{} mPa·s", kv40 * dice.between(5.0, 500.0)),
        );
    }
    for key in keys::all().filter(|key| key.path.starts_with("oil.")) {
        let name = key.path.trim_start_matches("oil.");
        if ["name", "class", "viscosity_index", "in_service"].contains(&name) || !dice.maybe(0.5) {
            continue;
        }
        let one_wild = dice.maybe(wild);
        if let Some(text) = draw(dice, &key, one_wild) {
            put(name, text);
        }
    }
    if number == 1 && dice.maybe(0.7) {
        put("in_service", "true".to_owned());
    }
}

/// The US unit a metric one is turned into.
const US: &[(&str, &str)] = &[
    ("°C", "°F"),
    ("K", "°F"),
    ("kPa", "psi"),
    ("mm", "in"),
    ("m", "ft"),
    ("m²", "ft²"),
    ("L", "gal"),
    ("cm³", "in³"),
    ("kg", "lb"),
    ("kg/m³", "lb/ft³"),
    ("L/min", "gpm"),
    ("m/s", "mph"),
    ("W/K", "Btu/(h·°F)"),
    ("W/(m²·K)", "Btu/(h·ft²·°F)"),
    ("W/(m·K)", "Btu/(h·ft·°F)"),
    ("W/cm²", "W/in²"),
    ("W", "kW"),
    ("h", "min"),
];

/// The same case, typed in US units.
fn in_us_units(texts: &Texts) -> Texts {
    let turn = |kind: &Kind, text: &str, unit: Option<&str>| {
        let unit = unit.or_else(|| Some(US.iter().find(|(metric, _)| *metric == kind.unit)?.1))?;
        // A pressure is given absolute or over the air outside, as its kind is.
        Some(format!("{} {unit}", kind.in_unit(kind.read(text).ok()?, unit)?))
    };
    texts
        .iter()
        .map(|(key, text)| {
            if let Some((table, at)) = key.split_once("viscosity.") {
                if let Some(at) = turn(Temperature::KIND, at, Some("°F")) {
                    return (format!("{table}viscosity.{at}"), text.clone());
                }
            }
            let kind = match keys::find(key).map(|key| key.kind) {
                Some(KeyKind::Quantity(kind)) => Some(kind),
                Some(KeyKind::Minimum) => Some(Temperature::KIND),
                _ => None,
            };
            let turned = kind.and_then(|kind| turn(kind, text, None));
            (key.clone(), turned.unwrap_or_else(|| text.clone()))
        })
        .collect()
}

/// The case as checked, or its faults.
fn check(texts: &Texts) -> Result<Case, Faults> {
    let mut file = CaseFile::read("random", "format = 1\n");
    for (key, text) in texts {
        file.set(key, text).map_err(|fault| Faults(vec![fault]))?;
    }
    file.check()
}

/// The case without what contradicts the rest, and its texts; `None` where it stays refused.
fn made_legal(mut texts: Texts) -> Option<(Texts, Case)> {
    for _ in 0..12 {
        let faults = match check(&texts) {
            Ok(case) => return Some((texts, case)),
            Err(faults) => faults,
        };
        for fault in faults.0 {
            let before = texts.len();
            texts.retain(|(key, _)| *key != fault.key);
            if texts.len() == before {
                // What is missing belongs to a table that is not whole: it goes.
                let (table, _) = fault.key.rsplit_once('.')?;
                texts.retain(|(key, _)| !key.starts_with(&format!("{table}.")));
            }
        }
    }
    None
}

/// The case with a few values changed, `None` where it is refused.
fn changed(texts: &Texts, edits: &[(&str, String)]) -> Option<Case> {
    let mut texts = texts.clone();
    for (key, text) in edits {
        texts.retain(|(there, _)| there != key);
        texts.push(((*key).to_owned(), text.clone()));
    }
    check(&texts).ok()
}

/// Floors as numbers that can be compared: unattainable or not proven is the warmest.
fn floors(found: &Assessment) -> [f64; 3] {
    [found.start_floor, found.light_floor, found.work_floor]
        .map(|floor| floor.at_c.unwrap_or(f64::INFINITY))
}

/// What two searches may differ by, K.
const CLOSE: f64 = 2e-4;

fn no_lower(after: &Decision, before: &Decision) -> Result<(), String> {
    for (after, before) in after.oils.iter().zip(&before.oils) {
        for (row, (now, then)) in floors(after).into_iter().zip(floors(before)).enumerate() {
            if now < then - CLOSE {
                return Err(format!("floor {row} falls from {then} to {now}"));
            }
        }
    }
    Ok(())
}

fn no_less_power(after: &Decision, before: &Decision) -> Result<(), String> {
    for (after, before) in after.oils.iter().zip(&before.oils) {
        // No figure where the target may not be heated to: that is no less either.
        if let (Some(now), Some(then)) = (after.heating.needed_w, before.heating.needed_w) {
            if now < then * (1.0 - 1e-4) {
                return Err(format!("needed power falls from {then} to {now}"));
            }
        }
    }
    Ok(())
}

/// Figures of a decision that are no numbers.
fn not_finite(decision: &Decision) -> Option<String> {
    let text = format!("{decision:?}");
    ["NaN", " inf", "-inf", "(inf", ": inf"].iter().find_map(|bad| text.find(bad)).map(|at| {
        text.chars().skip(text[..at].chars().count().saturating_sub(80)).take(120).collect()
    })
}

fn value_of(texts: &Texts, key: &str) -> Option<f64> {
    let text = &texts.iter().find(|(there, _)| there == key)?.1;
    text.split(' ').next()?.parse().ok()
}

/// One change that may not make anything easier: its name, and what came of it.
fn harder(
    dice: &mut Dice,
    texts: &Texts,
    case: &Case,
    before: &Decision,
) -> (&'static str, Result<(), String>) {
    let which =
        dice.pick(&["elevation", "length", "bore", "heating", "wind", "time", "thicker", "index"]);
    let by = |dice: &mut Dice| dice.between(0.01, 0.6);
    let edits: Vec<(&str, String)> = match which {
        "elevation" => {
            let to = case.site.elevation.as_m() + 3000.0 * by(dice);
            vec![("site.elevation", format!("{to} m"))]
        }
        "length" => match value_of(texts, "suction.length") {
            Some(m) => vec![("suction.length", format!("{} m", m * (1.0 + by(dice))))],
            None => return (which, Ok(())),
        },
        "bore" => match value_of(texts, "suction.bore") {
            Some(mm) => vec![("suction.bore", format!("{} mm", mm * (1.0 - by(dice))))],
            None => return (which, Ok(())),
        },
        "heating" => {
            let to = case.site.heating.as_celsius() - 8.0 * by(dice);
            if to < case.site.minimum.as_celsius() {
                return (which, Ok(()));
            }
            vec![("site.heating_temperature", format!("{to} °C"))]
        }
        "wind" => {
            vec![("site.wind", format!("{} m/s", case.site.wind.as_m_per_s() + 5.0 * by(dice)))]
        }
        "time" => match value_of(texts, "duty.time_to_warm") {
            Some(h) => vec![("duty.time_to_warm", format!("{} h", h * (1.0 - by(dice))))],
            None => return (which, Ok(())),
        },
        "thicker" => return (which, thicker(texts, case, 1.0 + by(dice))),
        _ => return (which, higher_index(texts, by(dice) * 60.0)),
    };
    let Some(after) = changed(texts, &edits) else { return (which, Ok(())) };
    let after = advice::decide(&after);
    let result = match which {
        "elevation" | "length" | "bore" => no_lower(&after, before),
        _ => no_less_power(&after, before),
    };
    (which, result)
}

/// Both oils through dense points, so that the line keeps the factor.
fn thicker(texts: &Texts, case: &Case, factor: f64) -> Result<(), String> {
    let oil = &case.oils[0];
    if oil.expected(-60.0) * factor > 1.8e7 {
        return Ok(());
    }
    let with = |factor: f64| {
        let mut texts: Texts = texts
            .iter()
            .filter(|(key, _)| {
                !key.contains("viscosity.")
                    && !key.ends_with("viscosity_index")
                    && !key.contains("oil[2]")
                    && !key.contains("oil[3]")
            })
            .cloned()
            .collect();
        for t in [-60.0_f64, -50.0, -40.0, -30.0, -20.0, -10.0, 0.0, 20.0, 40.0, 60.0, 80.0, 100.0]
        {
            texts.push((
                format!("oil[1].viscosity.{t} °C"),
                format!("{} mm²/s", oil.expected(t) * factor),
            ));
        }
        check(&texts).ok().map(|case| advice::decide(&case))
    };
    match (with(factor), with(1.0)) {
        (Some(after), Some(before)) => no_lower(&after, &before),
        _ => Ok(()),
    }
}

fn higher_index(texts: &Texts, more: f64) -> Result<(), String> {
    // The base is guessed from the index where it is not given: then it may change with it.
    let based = texts.iter().any(|(key, _)| key == "oil[1].base");
    let Some(index) = value_of(texts, "oil[1].viscosity_index").filter(|_| based) else {
        return Ok(());
    };
    let alone: Texts =
        texts.iter().filter(|(key, _)| !key.contains("cold_viscosity.")).cloned().collect();
    let with = |index: f64| {
        changed(&alone, &[("oil[1].viscosity_index", index.to_string())])
            .map(|case| advice::decide(&case))
    };
    let (Some(before), Some(after)) = (with(index), with(index + more)) else { return Ok(()) };
    let (then, now) = (floors(&before.oils[0])[0], floors(&after.oils[0])[0]);
    // Over 40 °C, where the two are equally thick, the one of higher index is the thicker.
    if then <= 40.0 && now > then + CLOSE {
        return Err(format!("start floor rises from {then} to {now} with {more} more index"));
    }
    Ok(())
}

fn same_answer(metric: &Decision, us: &Decision) -> Result<(), String> {
    for (one, other) in metric.oils.iter().zip(&us.oils) {
        for (a, b) in [
            (one.start_floor, other.start_floor),
            (one.light_floor, other.light_floor),
            (one.work_floor, other.work_floor),
        ] {
            let near = match (a.at_c, b.at_c) {
                (Some(a), Some(b)) => (a - b).abs() < CLOSE,
                (a, b) => a == b,
            };
            // Two limits that meet within rounding may trade places.
            let tie = one
                .limits
                .iter()
                .filter(|row| match (row.outcome, a.at_c) {
                    (Outcome::At(t), Some(floor)) => (t - floor).abs() < CLOSE,
                    _ => false,
                })
                .count()
                > 1;
            if !near || (a.set_by != b.set_by && !tie) {
                return Err(format!("{a:?} in metric, {b:?} in US units"));
            }
        }
    }
    let choice = |d: &Decision| d.chosen().map(|plan| (plan.kind, plan.oil, plan.heater_w));
    if choice(metric) != choice(us) {
        return Err(format!("{:?} in metric, {:?} in US units", choice(metric), choice(us)));
    }
    Ok(())
}

/// Every figure of every sentence and every number of the JSON is finite.
fn whole_advice(case: &Case) -> Result<(), String> {
    let advice = advice::advise(case);
    for part in advice.procedure.iter().flat_map(|step| &step.text.0) {
        if let Part::Figure { figure, .. } = part {
            let value: f64 = Figure::value(*figure);
            if !value.is_finite() {
                return Err(format!("{value} in a step"));
            }
        }
    }
    let json = report::advice_json(case, &advice);
    let text = json.to_string();
    if text.contains("NaN") || text.contains("inf,") {
        return Err("no number in the JSON".to_owned());
    }
    let document = report::advice(case, &advice, case.units);
    for line in document.blocks.iter().flat_map(|block| block.lines()) {
        if line.0.iter().any(|span| span.text.contains("NaN") || span.text.starts_with("inf ")) {
            return Err(format!("no number on screen: {line:?}"));
        }
    }
    Ok(())
}

/// What came of the run.
#[derive(Default)]
struct Tally {
    refused: AtomicU64,
    answers: Mutex<BTreeMap<String, u64>>,
    harder: Mutex<BTreeMap<&'static str, u64>>,
    broken: Mutex<Vec<String>>,
}

fn one_case(seed: u64, tally: &Tally) -> bool {
    let mut dice = Dice::seeded(seed);
    let texts = random_texts(&mut dice);
    let Some((texts, case)) = made_legal(texts) else {
        tally.refused.fetch_add(1, Ordering::Relaxed);
        return false;
    };
    let decision = advice::decide(&case);
    let mut faults = Vec::new();
    faults.extend(not_finite(&decision).map(|at| format!("no number: {at}")));
    match check(&in_us_units(&texts)) {
        Ok(us) => faults.extend(same_answer(&decision, &advice::decide(&us)).err()),
        Err(refused) => faults.push(format!("refused in US units: {refused}")),
    }
    let (which, result) = harder(&mut dice, &texts, &case, &decision);
    faults.extend(result.err().map(|text| format!("{which}: {text}")));
    if seed % 61 == 0 {
        faults.extend(whole_advice(&case).err());
    }
    let plan = decision.chosen().map_or("none", |plan| plan.kind.id());
    *tally.answers.lock().unwrap().entry(plan.to_owned()).or_default() += 1;
    *tally.harder.lock().unwrap().entry(which).or_default() += 1;
    for fault in faults {
        let lines: Vec<String> =
            texts.iter().map(|(key, text)| format!("  {key} = {text}")).collect();
        tally.broken.lock().unwrap().push(format!("seed {seed}: {fault}\n{}", lines.join("\n")));
    }
    true
}

#[test]
fn the_whole_legal_space_is_answered_honestly() {
    let number = |name: &str, default: u64| {
        std::env::var(name).ok().and_then(|text| text.parse().ok()).unwrap_or(default)
    };
    let (wanted, first) = (number("CASES", 2000), number("SEED", 20_261_201));
    let (next, made) = (AtomicU64::new(first), AtomicU64::new(0));
    let tally = Tally::default();
    std::thread::scope(|scope| {
        for _ in 0..std::thread::available_parallelism().map_or(1, std::num::NonZero::get) {
            scope.spawn(|| {
                while made.load(Ordering::Relaxed) < wanted {
                    if one_case(next.fetch_add(1, Ordering::Relaxed), &tally) {
                        made.fetch_add(1, Ordering::Relaxed);
                    }
                }
            });
        }
    });
    let broken = tally.broken.into_inner().unwrap();
    let answers = tally.answers.into_inner().unwrap();
    println!(
        "{} cases answered, {} refused, {} broken; plans {answers:?}; made harder {:?}",
        made.into_inner(),
        tally.refused.into_inner(),
        broken.len(),
        tally.harder.into_inner().unwrap()
    );
    assert!(broken.is_empty(), "{}", broken[..broken.len().min(8)].join("\n\n"));
    assert!(answers.len() >= 7, "the cases are too much alike: {answers:?}");
}
