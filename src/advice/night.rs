//! The night before the shift: the oil in the tank from parking to full load, hour by hour.

use super::assess::{Assessment, Verdict};
use super::first_turn::Running;
use super::heating::{HeatingStatus, Tank};
use super::say::{Figure, Say};
use super::setup::Setup;
use crate::case::Case;
use crate::heat::{self, LossCurve, WarmUp};
use crate::oil::Oil;

/// Oil temperature over the night. Hours count from the shift's start, negative before it.
#[derive(Debug, Clone, PartialEq)]
pub struct Night {
    /// The oil.
    pub oil: String,
    /// Coldest air round the tank, °C: what the heater is sized for.
    pub air_c: f64,
    /// When the machine was parked, h; `None` where it is not given.
    pub parked_h: Option<f64>,
    /// When the heater is switched on, h; `None` where none is.
    pub switch_on_h: Option<f64>,
    /// What the oil comes to when the tank mixes with the cold rest of the circuit, °C; `None` where
    /// no start is followed.
    pub mixed_c: Option<f64>,
    /// What is known of the way, in order.
    pub parts: Vec<NightPart>,
    /// What it rests on, and what could not be drawn.
    pub remarks: Vec<Say>,
}

/// A stretch of the night.
#[derive(Debug, Clone, PartialEq)]
pub struct NightPart {
    /// Which.
    pub kind: Stretch,
    /// (h, °C), time rising.
    pub points: Vec<(f64, f64)>,
}

/// What the oil goes through.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[non_exhaustive]
pub enum Stretch {
    /// Parked, without heat.
    Cooling,
    /// Heated in the tank.
    Heating,
    /// Mixed with the cold rest and warmed by running in neutral.
    Running,
}

impl Stretch {
    /// In words.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Cooling => "parked, cooling",
            Self::Heating => "heated in the tank",
            Self::Running => "running in neutral, whole circuit",
        }
    }
}

/// Step between the points of the cooling, h.
const STEP_H: f64 = 0.25;
/// Running in neutral is followed at least so long, h.
const LEAST_RUNNING_H: f64 = 0.5;
/// And no further than this, K.
const MOST_RISE_K: f64 = 60.0;
/// And no longer than this, h.
const LONGEST_RUNNING_H: f64 = 2.0;

/// Follows one oil of a case through the night, by the loss curve that its heating was sized on.
///
/// Cooling runs at the loss a parked tank is judged by, heating at the loss as computed, from the
/// temperature it is sized from. A start that the assessment does not allow is not drawn.
///
/// # Source
/// [`crate::heat::PARKED`], [`crate::heat::WARM_UP`], [`crate::heat::CIRCULATION`].
#[must_use]
pub fn night(case: &Case, oil: &Oil, found: &Assessment) -> Night {
    let setup = Setup::new(case, oil);
    let tank = Tank::new(&setup);
    let heating = &found.heating;
    let start = case.duty.shift_start;
    let mut night = Night {
        oil: oil.name().to_owned(),
        air_c: setup.air_c,
        parked_h: case.duty.parked_at.map(|at| -at.hours_until(start)),
        switch_on_h: None,
        mixed_c: None,
        parts: Vec::new(),
        remarks: Vec::new(),
    };
    let mut part = |kind, points: Vec<(f64, f64)>| {
        if points.len() > 1 {
            night.parts.push(NightPart { kind, points });
        }
    };
    let sized = heating.status == HeatingStatus::Sized;
    let time = heating.time_s.filter(|_| sized);
    night.switch_on_h = time.map(|time| {
        let (clock, days) = start.before(time);
        let minutes = f64::from(start.minutes()) - f64::from(clock.minutes());
        -(minutes / 60.0 + 24.0 * f64::from(days))
    });

    match (case.duty.parked_oil, night.parked_h) {
        _ if case.duty.standing.as_hours() > heat::LONGEST_CREDIT_H => night.remarks.push(
            "No cooling is drawn: it stands for over a day (duty.standing), and nothing is left of the warmth.".into(),
        ),
        (Some(parked), Some(from)) => {
            let to = night.switch_on_h.unwrap_or(0.0);
            part(Stretch::Cooling, cooling(&tank, parked.as_celsius(), (from, to), case));
        }
        _ => night.remarks.push(
            "No cooling is drawn: when the machine is parked (duty.parked_at) and how warm its oil is then (duty.parked_oil) are not both given.".into(),
        ),
    }
    let target = heating.mean_target_c.filter(|_| sized);
    if let (Some(time), Some(energy), Some(target), Some(on)) =
        (time, heating.energy_kwh, target, night.switch_on_h)
    {
        let electrical_w = if time > 0.0 { energy * 3.6e6 / time } else { 0.0 };
        let power = heat::into_oil_w(case.element.kind, electrical_w, &case.policy.heat);
        let way = WarmUp::new(&tank.curve, &tank.capacity, tank.soak_c, target, 1.0);
        if let Some(path) = way.path(power) {
            part(Stretch::Heating, path.iter().map(|(s, t)| (on + s / 3600.0, *t)).collect());
        }
        night.remarks.push(Say::fill(
            "Heating is drawn from {from}, which the heater is sized from, whatever warmth is left.",
            &[("from", Figure::Temperature(tank.soak_c).into())],
        ));
    } else if !matches!(heating.status, HeatingStatus::Sized | HeatingStatus::NotNeeded) {
        night.remarks.push("No heating is drawn: no heater is found that does it here.".into());
    }

    let starts = match found.verdict {
        Verdict::StartsCold | Verdict::StartsColdInletUnproven => true,
        Verdict::NeedsHeat => sized || heating.status == HeatingStatus::NotNeeded,
        _ => false,
    };
    if starts {
        let tank_c = target.unwrap_or(tank.soak_c);
        match Running::new(&setup, &tank, tank_c, found.start_floor.at_c) {
            Ok(running) => {
                night.mixed_c = Some(running.mixed_c);
                let points = running_points(&running, tank_c, found.work_floor.at_c);
                if points.len() < 3 && found.circulation.why.is_none() {
                    night.remarks.push("In neutral it does not get warmer.".into());
                }
                night.parts.push(NightPart { kind: Stretch::Running, points });
                night.remarks.push(
                    "After the first turn the oil of the tank is taken as mixed at once with the cold rest of the circuit.".into(),
                );
            }
            Err(why) => {
                night.remarks.push(Say::from(format!("No running in neutral is drawn: {why}.")));
            }
        }
        if let Some(why) = found.circulation.why.filter(|_| found.circulation.steady_c.is_some()) {
            night.remarks.push(Say::from(format!("Running in neutral: {why}.")));
        }
    } else {
        night
            .remarks
            .push(Say::from(format!("No start is drawn: this oil {}.", found.verdict.words())));
    }
    night
}

/// The parked tank from one hour to another.
fn cooling(tank: &Tank<'_>, parked_c: f64, (from, to): (f64, f64), case: &Case) -> Vec<(f64, f64)> {
    let top = tank.curve.top_c();
    let hotter = (parked_c > top).then(|| LossCurve::new(&tank.loss, parked_c));
    let curve = hotter.as_ref().unwrap_or(&tank.curve);
    let (factor, air) = tank.parked_night(case, parked_c);
    let clock = case.duty.shift_start.hours();
    let steps = ((to - from) / STEP_H).ceil().max(1.0);
    let step = (to - from) / steps;
    let mut points = vec![(from, parked_c)];
    let mut t = parked_c;
    let mut at = 1.0;
    while at <= steps && to > from {
        let begun = from + (at - 1.0) * step;
        // The days before have the same hours.
        let of_day = (clock + begun).rem_euclid(24.0);
        t = heat::cooled_c(curve, &tank.capacity, t, step, factor, |hour| air(of_day + hour));
        points.push((from + at * step, t));
        at += 1.0;
    }
    points
}

/// From the tank at the gate through the mix to the work floor, or as far as two hours lead. Where it
/// would cool in neutral nothing is followed.
fn running_points(running: &Running, tank_c: f64, work_floor: Option<f64>) -> Vec<(f64, f64)> {
    let mut points = vec![(0.0, tank_c), (0.0, running.mixed_c)];
    let mixed = running.mixed_c;
    let steady = running.steady_c();
    let floor = work_floor.unwrap_or(f64::INFINITY);
    // Steps of temperature up to close to where it ends; without a loss there is no end.
    let end = mixed + 0.98 * (steady.min(mixed + MOST_RISE_K) - mixed);
    const PIECES: u32 = 100;
    for piece in 1..=PIECES {
        let t = mixed + (end - mixed) * f64::from(piece) / f64::from(PIECES);
        let Some(hours) = running.time_s(t).map(|s| s / 3600.0).filter(|_| end > mixed) else {
            break;
        };
        let done = points.last().is_some_and(|(h, t)| *t >= floor && *h >= LEAST_RUNNING_H);
        if done || hours > LONGEST_RUNNING_H {
            break;
        }
        points.push((hours, t));
    }
    points
}

#[cfg(test)]
mod tests {
    use super::{Stretch, night};
    use crate::advice::assess;
    use crate::case::CaseFile;

    #[test]
    fn the_night_ends_where_the_assessment_says() {
        let text = include_str!("../../examples/parked-warm-loader.toml");
        let case = CaseFile::read("parked-warm-loader.toml", text).check().unwrap();
        let mut checked = 0;
        for oil in &case.oils {
            let found = assess(&case, oil);
            let night = night(&case, oil, &found);
            for part in &night.parts {
                let rising = part.points.windows(2).all(|two| two[0].0 <= two[1].0);
                assert!(rising, "{part:?}");
            }
            // Credited: what is left in the morning is what heating would start from.
            if let (Some(cooled), None) = (night.parts.first(), night.switch_on_h) {
                assert_eq!(cooled.kind, Stretch::Cooling);
                let (hour, t) = cooled.points[cooled.points.len() - 1];
                assert!(hour.abs() < 1e-9 && (t - found.tank_soak_c).abs() < 0.02, "{hour} {t}");
                checked += 1;
            }
            if let Some(heated) = night.parts.iter().find(|part| part.kind == Stretch::Heating) {
                let (first, last) = (heated.points[0], heated.points[heated.points.len() - 1]);
                assert_eq!(first, (night.switch_on_h.unwrap(), found.tank_soak_c));
                assert!((last.1 - found.heating.mean_target_c.unwrap()).abs() < 1e-9);
                assert!(last.0 <= 1e-9 && last.0 > -5.0 / 60.0 - 1e-9, "ready within five minutes");
            }
        }
        assert!(checked > 0);
    }
}
