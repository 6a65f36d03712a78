//! A fleet as a document and as CSV rows.

use super::document::{Block, Document, Line};
use super::units::{Shown, energy};
use crate::advice::PlanKind;
use crate::case::Units;
use crate::fleet::{Job, Machine, stock, yard};
use std::collections::BTreeMap;

/// The first line of the CSV.
pub const FLEET_HEADER: &str = "machine,count,oil,verdict,start_floor_c,start_floor_set_by,light_floor_c,work_floor_c,plan,plan_oil,heater_w,energy_kwh,switch_on,days_before,starts,error\n";

/// One machine as a CSV row.
#[must_use]
pub fn fleet_row(machine: &Machine) -> String {
    let number = |value: Option<f64>| value.map_or_else(String::new, |v| super::six(v).to_string());
    let (clock, days) = machine
        .switch_on
        .map_or_else(Default::default, |(clock, days)| (clock.to_string(), days.to_string()));
    let fields = [
        quoted(&machine.name),
        machine.count.to_string(),
        quoted(&machine.oil),
        machine.verdict.to_owned(),
        number(machine.start_floor_c),
        machine.set_by.to_owned(),
        number(machine.light_floor_c),
        number(machine.work_floor_c),
        machine.plan.unwrap_or_default().to_owned(),
        quoted(machine.plan_oil.as_deref().unwrap_or_default()),
        number(machine.heater_w),
        number(machine.energy_kwh),
        clock,
        days,
        machine.starts.to_string(),
        String::new(),
    ];
    format!("{}\n", fields.join(","))
}

/// A row that could not be decided.
#[must_use]
pub fn fleet_fault(machine: &str, faults: &[String]) -> String {
    format!("{},,,,,,,,,,,,,,,{}\n", quoted(machine), quoted(&faults.join("; ")))
}

/// A CSV field (RFC 4180); what a spreadsheet would take for a formula is set in an apostrophe.
fn quoted(text: &str) -> String {
    let text: String = text.chars().map(|c| if c.is_control() { ' ' } else { c }).collect();
    let text = if text.starts_with(['=', '+', '@']) { format!("'{text}") } else { text };
    if text.contains([',', '"', '\n']) {
        format!("\"{}\"", text.replace('"', "\"\""))
    } else {
        text
    }
}

/// A whole fleet: what to buy, what to fit, what to stock, what the yard's supply must carry.
#[must_use]
pub fn fleet(
    title: &str,
    machines: &[Machine],
    faults: &[String],
    limit_w: f64,
    units: Units,
) -> Document {
    let shown = Shown(units);
    let total: u32 = machines.iter().map(|machine| machine.count).sum();
    let mut plans: BTreeMap<&str, u32> = BTreeMap::new();
    for machine in machines {
        *plans.entry(machine.plan.unwrap_or("none allowed")).or_default() += machine.count;
    }
    let mut pairs =
        vec![("machines".to_owned(), Line::from(format!("{total} in {} rows", machines.len())))];
    pairs.extend(
        plans.iter().map(|(plan, count)| (words(plan).to_owned(), Line::from(count.to_string()))),
    );
    let stuck: Vec<&Machine> = machines.iter().filter(|machine| !machine.starts).collect();
    let mut blocks = vec![Block::Title(Line::from(title)), Block::Pairs(pairs)];
    if !stuck.is_empty() {
        let names: Vec<&str> = stuck.iter().map(|machine| machine.name.as_str()).collect();
        blocks.push(Block::Text(
            Line::new()
                .strong(format!("{} start by no plan: ", stuck.len()))
                .words(names.join(", ")),
        ));
    }
    blocks.push(Block::Heading(Line::from("Machine by machine")));
    let floor = |t: Option<f64>| Line::from(t.map_or("never".to_owned(), |t| shown.temperature(t)));
    let rows = machines
        .iter()
        .map(|machine| {
            vec![
                Line::from(if machine.count > 1 {
                    format!("{} x{}", machine.name, machine.count)
                } else {
                    machine.name.clone()
                }),
                Line::from(machine.oil.clone()),
                floor(machine.start_floor_c),
                Line::from(machine.plan.map_or("-", words)),
                Line::from(machine.plan_oil.clone().unwrap_or_else(|| "-".to_owned())),
                Line::from(machine.heater_w.map_or("-".to_owned(), |w| shown.power(w))),
                Line::from(
                    machine.switch_on.map_or("-".to_owned(), |(clock, _)| clock.to_string()),
                ),
            ]
        })
        .collect();
    blocks.push(Block::Table {
        head: ["machine", "oil now", "turn from", "plan", "on", "heater", "switch on"]
            .map(str::to_owned)
            .to_vec(),
        rows,
    });
    stocked(&mut blocks, machines);
    heaters(&mut blocks, machines, shown);
    supplied(&mut blocks, machines, limit_w, shown);
    if !faults.is_empty() {
        blocks.push(Block::Heading(Line::from("Rows that are wrong")));
        blocks.push(Block::List(faults.iter().map(|fault| Line::from(fault.clone())).collect()));
    }
    blocks.push(Block::Text(Line::from(
        "Each machine's own advice, with procedure and cautions, is that of `coldsump advise`; the machine's manual, local codes and a licensed electrician come before this page.",
    )));
    Document { blocks }
}

/// A plan in words, by its id.
fn words(id: &str) -> &str {
    match id.parse::<PlanKind>() {
        Ok(kind) => kind.words(),
        Err(_) => id,
    }
}

fn stocked(blocks: &mut Vec<Block>, machines: &[Machine]) {
    let stock = stock(machines);
    blocks.push(Block::Heading(Line::from("Oils to stock")));
    let mut pairs: Vec<(String, Line)> = stock
        .oils
        .iter()
        .map(|(oil, count)| (oil.clone(), Line::from(format!("{count} machines"))))
        .collect();
    let number = stock.oils.len();
    let proof = if stock.lower_bound == number {
        format!(
            "{number} is the least there is: {} share no oil ({})",
            if number == 1 { "one machine needs one; none" } else { "these machines" },
            stock.apart.join(", ")
        )
    } else if stock.proven {
        format!(
            "{number} is the least there is: every smaller set was tried ({} at least by machines that share none)",
            stock.lower_bound
        )
    } else {
        format!("at least {}, found {number}; the search was not finished", stock.lower_bound)
    };
    pairs.push(("proof".to_owned(), Line::from(proof)));
    pairs.push(("energy of a start, all".to_owned(), Line::from(energy(stock.energy_kwh))));
    blocks.push(Block::Pairs(pairs));
    let mut notes: Vec<Line> = stock
        .further
        .iter()
        .take(3)
        .map(|(oil, saved)| {
            Line::from(format!("{oil} besides would save {} a start of all", energy(*saved)))
        })
        .collect();
    notes.extend(
        stock
            .forced
            .iter()
            .take(12)
            .map(|(machine, oil)| Line::from(format!("{machine} forces {oil}: it has no other"))),
    );
    if stock.forced.len() > 12 {
        notes.push(Line::from(format!("{} more force one oil", stock.forced.len() - 12)));
    }
    if !stock.without.is_empty() {
        notes.push(Line::from(format!("no oil starts: {}", stock.without.join(", "))));
    }
    if !notes.is_empty() {
        blocks.push(Block::List(notes));
    }
}

fn heaters(blocks: &mut Vec<Block>, machines: &[Machine], shown: Shown) {
    let mut sizes: BTreeMap<u64, (u32, u32)> = BTreeMap::new();
    for machine in machines {
        if let Some(watts) = machine.heater_w {
            let covered = machine.plan == Some("blanket-and-hold");
            #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "watts")]
            let entry = sizes.entry(watts.round() as u64).or_default();
            entry.0 += machine.count;
            entry.1 += if covered { machine.count } else { 0 };
        }
    }
    if sizes.is_empty() {
        return;
    }
    blocks.push(Block::Heading(Line::from("Heaters to fit")));
    let rows = sizes
        .iter()
        .map(|(watts, (count, covered))| {
            vec![
                Line::from(shown.power(*watts as f64)),
                Line::from(count.to_string()),
                Line::from(covered.to_string()),
            ]
        })
        .collect();
    blocks.push(Block::Table {
        head: ["heater", "how many, a cord each", "of them with a blanket"]
            .map(str::to_owned)
            .to_vec(),
        rows,
    });
}

/// Minutes of a slot, and hours before midnight that switching on may begin.
const SLOT_MIN: f64 = 5.0;
const BEFORE_H: f64 = 12.0;

fn supplied(blocks: &mut Vec<Block>, machines: &[Machine], limit_w: f64, shown: Shown) {
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "a day of slots")]
    let jobs: Vec<Job> = machines
        .iter()
        .filter_map(|machine| {
            let ready =
                ((BEFORE_H * 60.0 + f64::from(machine.shift.minutes())) / SLOT_MIN) as usize;
            let slots = (machine.ready_s? / 60.0 / SLOT_MIN).ceil() as usize;
            let count = f64::from(machine.count);
            let (heater, hold) = (machine.heater_w? * count, machine.hold_w? * count);
            // A tank that is held takes its holding power all night.
            let held = machine.plan == Some("blanket-and-hold");
            Some(Job {
                machine: machine.name.clone(),
                heater_w: if held { hold } else { heater },
                hold_w: hold,
                slots: if held { ready } else { slots },
                ready,
            })
        })
        .collect();
    if jobs.is_empty() {
        return;
    }
    let plan = yard(&jobs, limit_w);
    blocks.push(Block::Heading(Line::from("The yard's supply")));
    let mut pairs = vec![
        ("peak, switched on as below".to_owned(), Line::from(shown.power(plan.peak_w))),
        ("peak, all at the last minute".to_owned(), Line::from(shown.power(plan.last_minute_w))),
        ("no plan has less than".to_owned(), Line::from(shown.power(plan.bound_w))),
    ];
    if limit_w.is_finite() {
        pairs.push(("the supply carries".to_owned(), Line::from(shown.power(limit_w))));
    }
    if !plan.late.is_empty() {
        let names: Vec<&str> = plan
            .late
            .iter()
            .filter_map(|at| jobs.get(*at))
            .map(|job| job.machine.as_str())
            .collect();
        let more: f64 =
            plan.late.iter().filter_map(|at| jobs.get(*at)).map(|job| job.heater_w).sum();
        pairs.push((
            "cannot be ready".to_owned(),
            Line::new()
                .strong(names.join(", "))
                .words(format!("; {} more would be enough", shown.power(more))),
        ));
    }
    blocks.push(Block::Pairs(pairs));
    let clock = |slot: usize| {
        let minutes = slot as f64 * SLOT_MIN + 24.0 * 60.0 - BEFORE_H * 60.0;
        let minutes = minutes.rem_euclid(24.0 * 60.0);
        format!("{:02}:{:02}", (minutes / 60.0).floor(), minutes.rem_euclid(60.0))
    };
    let mut slots = plan.slots.clone();
    slots.sort_by_key(|slot| slot.on);
    let rows = slots
        .iter()
        .filter_map(|slot| {
            let job = jobs.get(slot.job)?;
            Some(vec![
                Line::from(job.machine.clone()),
                Line::from(clock(slot.on)),
                Line::from(shown.power(job.heater_w)),
                Line::from(clock(job.ready)),
            ])
        })
        .collect();
    blocks.push(Block::Table {
        head: ["machine", "switch on", "heater", "ready by"].map(str::to_owned).to_vec(),
        rows,
    });
}

/// How a fleet stands at one value of a sweep.
#[derive(Debug, Clone)]
pub struct SweepRow {
    value: String,
    plans: BTreeMap<&'static str, u32>,
    starts: u32,
    all: u32,
    /// Rows that were wrong there.
    pub wrong: u32,
}

impl SweepRow {
    /// Nothing counted yet.
    #[must_use]
    pub fn new(value: &str) -> Self {
        Self { value: value.to_owned(), plans: BTreeMap::new(), starts: 0, all: 0, wrong: 0 }
    }

    /// Counts a machine.
    pub fn add(&mut self, machine: &Machine) {
        self.all += machine.count;
        self.starts += if machine.starts { machine.count } else { 0 };
        *self.plans.entry(machine.plan.unwrap_or("none")).or_default() += machine.count;
    }
}

/// A sweep: how many machines start at each value.
#[must_use]
pub fn sweep(key: &str, rows: &[SweepRow]) -> Document {
    let count = |row: &SweepRow, plans: &[&str]| -> String {
        row.plans
            .iter()
            .filter(|(plan, _)| plans.contains(plan))
            .map(|(_, n)| n)
            .sum::<u32>()
            .to_string()
    };
    let table = rows
        .iter()
        .map(|row| {
            vec![
                Line::from(row.value.clone()),
                Line::from(format!("{} of {}", row.starts, row.all)),
                Line::from(count(row, &["start-cold", "start-warm-tank"])),
                Line::from(count(row, &["change-oil"])),
                Line::from(count(row, &["heat", "blanket-and-hold"])),
                Line::from(count(row, &["change-and-heat"])),
                Line::from(count(row, &["whole-machine-heat", "keep-running", "none"])),
                Line::from(row.wrong.to_string()),
            ]
        })
        .collect();
    Document {
        blocks: vec![
            Block::Title(Line::from(format!("Over {key}"))),
            Block::Table {
                head: [key, "start", "cold", "change oil", "heat", "change, heat", "none", "wrong"]
                    .map(str::to_owned)
                    .to_vec(),
                rows: table,
            },
        ],
    }
}
