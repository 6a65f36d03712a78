//! The fewest oils that start every machine: solved exactly, with what proves it.

use super::machine::Machine;
use std::collections::{BTreeMap, BTreeSet};

/// What to stock.
#[derive(Debug, Clone, PartialEq)]
pub struct Stock {
    /// The oils, each with the machines it goes into.
    pub oils: Vec<(String, u32)>,
    /// So many oils are needed at the least: machines that no two of share an oil.
    pub lower_bound: usize,
    /// Those machines.
    pub apart: Vec<String>,
    /// The whole search was done, so the number of oils is the least there is.
    pub proven: bool,
    /// Energy of a start of all machines together with these oils, kWh.
    pub energy_kwh: f64,
    /// What one more oil would save of it, best first, kWh.
    pub further: Vec<(String, f64)>,
    /// Machines with one oil only.
    pub forced: Vec<(String, String)>,
    /// Machines that no oil starts by an allowed plan.
    pub without: Vec<String>,
}

/// More oils than these are not searched exactly.
const MOST_OILS: usize = 64;
/// More nodes of the search than these are not looked at.
const MOST_NODES: u64 = 20_000_000;

/// The fewest oils for a fleet.
#[must_use]
pub fn stock(machines: &[Machine]) -> Stock {
    let names: Vec<String> = machines
        .iter()
        .flat_map(|machine| machine.oils.iter().map(|choice| choice.oil.clone()))
        .collect::<BTreeSet<_>>()
        .into_iter()
        .take(MOST_OILS)
        .collect();
    let place: BTreeMap<&str, usize> =
        names.iter().enumerate().map(|(at, name)| (name.as_str(), at)).collect();
    let mask = |machine: &Machine| {
        machine
            .oils
            .iter()
            .filter_map(|choice| place.get(choice.oil.as_str()))
            .fold(0_u64, |mask, at| mask | 1 << at)
    };
    let masks: Vec<u64> = machines.iter().map(mask).collect();
    // A machine that more oils start than another's is met when the other is: only the least count.
    let distinct: BTreeSet<u64> = masks.iter().copied().filter(|mask| *mask != 0).collect();
    let least: Vec<u64> = distinct
        .iter()
        .copied()
        .filter(|mask| !distinct.iter().any(|other| other != mask && other & mask == *other))
        .collect();
    let apart = disjoint(&least);
    let mut search = Search { best: greedy(&least), nodes: 0 };
    search.cover(&least, 0);
    let chosen = search.best;
    let energy = |set: u64| -> f64 {
        machines
            .iter()
            .map(|machine| {
                machine
                    .oils
                    .iter()
                    .filter(|c| place.get(c.oil.as_str()).is_some_and(|at| set & (1 << at) != 0))
                    .map(|choice| choice.energy_kwh)
                    .fold(f64::INFINITY, f64::min)
                    * f64::from(machine.count)
            })
            .filter(|energy| energy.is_finite())
            .sum()
    };
    let base = energy(chosen);
    let mut further: Vec<(String, f64)> = (0..names.len())
        .filter(|at| chosen & (1 << at) == 0)
        .filter_map(|at| Some((names.get(at)?.clone(), base - energy(chosen | 1 << at))))
        .filter(|(_, saved)| *saved > 0.05)
        .collect();
    further.sort_by(|a, b| b.1.total_cmp(&a.1).then(a.0.cmp(&b.0)));
    let goes_into = |machine: &Machine| {
        machine
            .oils
            .iter()
            .filter(|c| place.get(c.oil.as_str()).is_some_and(|at| chosen & (1 << at) != 0))
            .min_by(|a, b| a.energy_kwh.total_cmp(&b.energy_kwh).then(a.oil.cmp(&b.oil)))
            .map(|choice| choice.oil.clone())
    };
    let mut oils: BTreeMap<String, u32> = BTreeMap::new();
    for machine in machines {
        if let Some(oil) = goes_into(machine) {
            *oils.entry(oil).or_default() += machine.count;
        }
    }
    // An oil that is only chosen to cover, and beaten everywhere, still counts.
    for (at, name) in names.iter().enumerate() {
        if chosen & (1 << at) != 0 {
            oils.entry(name.clone()).or_default();
        }
    }
    Stock {
        oils: oils.into_iter().collect(),
        lower_bound: apart.len(),
        apart: apart
            .iter()
            .filter_map(|mask| {
                let at = masks.iter().position(|other| other == mask)?;
                machines.get(at).map(|machine| machine.name.clone())
            })
            .collect(),
        proven: search.nodes < MOST_NODES && names.len() < MOST_OILS,
        energy_kwh: base,
        further,
        forced: machines
            .iter()
            .filter_map(|machine| match machine.oils.as_slice() {
                [only] => Some((machine.name.clone(), only.oil.clone())),
                _ => None,
            })
            .collect(),
        without: machines
            .iter()
            .filter(|machine| machine.oils.is_empty())
            .map(|machine| machine.name.clone())
            .collect(),
    }
}

/// Machines that no two of share an oil, picked one by one: as many oils are needed at the least.
fn disjoint(masks: &[u64]) -> Vec<u64> {
    let mut sorted = masks.to_vec();
    sorted.sort_by_key(|mask| mask.count_ones());
    let (mut taken, mut used) = (Vec::new(), 0);
    for mask in sorted {
        if mask & used == 0 {
            used |= mask;
            taken.push(mask);
        }
    }
    taken
}

/// A first cover: always the oil that most of what is left shares.
fn greedy(masks: &[u64]) -> u64 {
    let mut chosen = 0;
    loop {
        let left: Vec<u64> = masks.iter().copied().filter(|mask| mask & chosen == 0).collect();
        if left.is_empty() {
            return chosen;
        }
        let best = (0..64)
            .max_by_key(|at| left.iter().filter(|mask| *mask & (1 << at) != 0).count())
            .unwrap_or(0);
        chosen |= 1 << best;
    }
}

/// Branch and bound over the machine with the fewest oils.
struct Search {
    best: u64,
    nodes: u64,
}

impl Search {
    fn cover(&mut self, masks: &[u64], chosen: u64) {
        self.nodes += 1;
        if self.nodes >= MOST_NODES {
            return;
        }
        let left: Vec<u64> = masks.iter().copied().filter(|mask| mask & chosen == 0).collect();
        if left.is_empty() {
            if chosen.count_ones() < self.best.count_ones() {
                self.best = chosen;
            }
            return;
        }
        let needed = chosen.count_ones() as usize + disjoint(&left).len();
        if needed >= self.best.count_ones() as usize {
            return;
        }
        let Some(narrow) = left.iter().copied().min_by_key(|mask| mask.count_ones()) else {
            return;
        };
        let mut oils: Vec<u32> = (0..64).filter(|at| narrow & (1 << at) != 0).collect();
        oils.sort_by_key(|at| {
            std::cmp::Reverse(left.iter().filter(|mask| *mask & (1 << at) != 0).count())
        });
        for at in oils {
            self.cover(&left, chosen | 1 << at);
        }
    }
}
