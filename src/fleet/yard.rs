//! The yard's supply: who switches on when, so that all are ready and the peak is low.
//!
//! A heater that ends early holds its tank at the holding power until the shift. Times are in slots of
//! five minutes.

/// One heater to be fed.
#[derive(Debug, Clone, PartialEq)]
pub struct Job {
    /// The machine.
    pub machine: String,
    /// Heater, W.
    pub heater_w: f64,
    /// Power to hold, W.
    pub hold_w: f64,
    /// Warm-up, slots.
    pub slots: usize,
    /// Ready by this slot.
    pub ready: usize,
}

/// When one heater runs.
#[derive(Debug, Clone, PartialEq)]
pub struct Slot {
    /// Which job.
    pub job: usize,
    /// Switched on at this slot.
    pub on: usize,
}

/// A plan for the yard.
#[derive(Debug, Clone, PartialEq)]
pub struct Yard {
    /// Who switches on when.
    pub slots: Vec<Slot>,
    /// Its peak, W.
    pub peak_w: f64,
    /// The peak of everyone switching on at the last minute, W.
    pub last_minute_w: f64,
    /// No plan has a lower peak than this, W.
    pub bound_w: f64,
    /// Jobs that cannot be ready under the supply limit.
    pub late: Vec<usize>,
}

/// Plans a yard: no job is switched on before slot 0; `limit_w` is what the supply carries.
///
/// The largest heaters are placed first, each where the peak grows least, the latest of those; then
/// each is moved a few times more. Yards small enough are searched through. The bound is that of the largest heater and of the energy each window has
/// to take in.
#[must_use]
pub fn yard(jobs: &[Job], limit_w: f64) -> Yard {
    let end = jobs.iter().map(|job| job.ready).max().unwrap_or(0);
    let mut load = vec![0.0; end];
    let mut order: Vec<usize> = (0..jobs.len()).collect();
    let weight = |at: &usize| jobs.get(*at).map_or(0.0, |job| job.heater_w * job.slots as f64);
    order.sort_by(|a, b| weight(b).total_cmp(&weight(a)).then(a.cmp(b)));
    let mut on: Vec<Option<usize>> = vec![None; jobs.len()];
    for _round in 0..4 {
        for at in &order {
            let (Some(job), Some(place)) = (jobs.get(*at), on.get_mut(*at)) else { continue };
            if let Some(old) = place.take() {
                add(&mut load, job, old, -1.0);
            }
            *place = best(&load, job);
            if let Some(new) = *place {
                add(&mut load, job, new, 1.0);
            }
        }
    }
    if let Some(exact) = exact(jobs, end, peak(&load)) {
        load = vec![0.0; end];
        for (at, start) in exact.iter().enumerate() {
            if let (Some(job), Some(place)) = (jobs.get(at), on.get_mut(at)) {
                add(&mut load, job, *start, 1.0);
                *place = Some(*start);
            }
        }
    }
    let mut late: Vec<usize> =
        (0..jobs.len()).filter(|at| on.get(*at).is_none_or(Option::is_none)).collect();
    // Over the limit, the largest at the peak give way until what is left fits.
    while peak(&load) > limit_w + 1e-6 {
        let top = load.iter().position(|w| (*w - peak(&load)).abs() < 1e-9).unwrap_or(0);
        let largest = (0..jobs.len())
            .filter(|at| {
                let (job, on) = (jobs.get(*at), on.get(*at).copied().flatten());
                job.zip(on).is_some_and(|(job, on)| (on..job.ready).contains(&top))
            })
            .max_by(|a, b| weight(a).total_cmp(&weight(b)));
        let Some(at) = largest else { break };
        if let (Some(job), Some(place)) = (jobs.get(at), on.get_mut(at)) {
            if let Some(old) = place.take() {
                add(&mut load, job, old, -1.0);
            }
        }
        late.push(at);
    }
    late.sort_unstable();
    let last = {
        let mut load = vec![0.0; end];
        for job in jobs.iter().filter(|job| job.slots <= job.ready) {
            add(&mut load, job, job.ready - job.slots, 1.0);
        }
        peak(&load)
    };
    Yard {
        slots: on
            .iter()
            .enumerate()
            .filter_map(|(job, on)| Some(Slot { job, on: (*on)? }))
            .collect(),
        peak_w: peak(&load),
        last_minute_w: last,
        bound_w: bound(jobs),
        late,
    }
}

fn peak(load: &[f64]) -> f64 {
    load.iter().copied().fold(0.0, f64::max)
}

/// Adds a job to the load: heater while it warms, holding power from then to the shift.
fn add(load: &mut [f64], job: &Job, on: usize, sign: f64) {
    for (at, load) in load.iter_mut().enumerate().take(job.ready).skip(on) {
        *load += sign * if at < on + job.slots { job.heater_w } else { job.hold_w };
    }
}

/// More plans than these are not tried one by one.
const MOST_PLANS: f64 = 2_000_000.0;

/// The best of all plans, where they are few and one is under `peak_w`: each job's start.
fn exact(jobs: &[Job], end: usize, peak_w: f64) -> Option<Vec<usize>> {
    let mut plans = 1.0;
    for job in jobs {
        plans *= (job.ready.checked_sub(job.slots)? + 1) as f64;
    }
    if jobs.is_empty() || plans > MOST_PLANS {
        return None;
    }
    let mut best: (f64, Option<Vec<usize>>) = (peak_w - 1e-9, None);
    let mut starts = Vec::with_capacity(jobs.len());
    every(jobs, &mut vec![0.0; end], &mut starts, &mut best);
    best.1
}

fn every(
    jobs: &[Job],
    load: &mut [f64],
    starts: &mut Vec<usize>,
    best: &mut (f64, Option<Vec<usize>>),
) {
    let Some(job) = jobs.get(starts.len()) else {
        let peak = peak(load);
        if peak < best.0 {
            *best = (peak, Some(starts.clone()));
        }
        return;
    };
    for on in (0..=job.ready - job.slots).rev() {
        add(load, job, on, 1.0);
        starts.push(on);
        // What is there already can only grow.
        if peak(load) < best.0 {
            every(jobs, load, starts, best);
        }
        starts.pop();
        add(load, job, on, -1.0);
    }
}

/// Where a job makes the highest load it meets least; the latest of those.
fn best(load: &[f64], job: &Job) -> Option<usize> {
    let latest = job.ready.checked_sub(job.slots)?;
    let cost = |on: usize| {
        load.iter()
            .enumerate()
            .take(job.ready)
            .skip(on)
            .map(|(at, load)| load + if at < on + job.slots { job.heater_w } else { job.hold_w })
            .fold(0.0, f64::max)
            .max(load.iter().copied().fold(0.0, f64::max))
    };
    (0..=latest)
        .rev()
        .map(|on| (on, cost(on)))
        .min_by(|a, b| (a.1 * 1e3).round().total_cmp(&(b.1 * 1e3).round()).then(b.0.cmp(&a.0)))
        .map(|(on, _)| on)
}

/// No plan has a lower peak: the largest heater, and for each shift start the warm-ups due by then over
/// the time there is.
fn bound(jobs: &[Job]) -> f64 {
    let largest = jobs.iter().map(|job| job.heater_w).fold(0.0, f64::max);
    jobs.iter()
        .map(|last| {
            let due: f64 = jobs
                .iter()
                .filter(|job| job.ready <= last.ready)
                .map(|job| job.heater_w * job.slots as f64)
                .sum();
            if last.ready > 0 { due / last.ready as f64 } else { 0.0 }
        })
        .fold(largest, f64::max)
}
