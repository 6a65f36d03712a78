//! The first turn of the pump, and warming by circulation.

use super::heating::Tank;
use super::limits::Edge;
use super::setup::Setup;
use crate::heat::{self, HeatCapacity};
use crate::pump::{self, GRAVITY, Neutral};

/// The first turn. Figures that do not exist are `None`, and `whys` says why.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct FirstTurn {
    /// Time to draw the cold oil out of the hose, s.
    pub hose_clearing_s: Option<f64>,
    /// Share of its flow the pump gets at first; 1 and more is full.
    pub hose_fill: Option<f64>,
    /// Thermostat, or what a parked tank kept, over the pump body at the soak, K; 0 where nothing is
    /// warmer than the pump.
    pub pump_difference_k: Option<f64>,
    /// Vacuum at the pump at the gate and start speed, kPa under the local air.
    pub vacuum_at_gate_kpa: Option<f64>,
    /// Highest speed at the gate, rpm.
    pub speed_max_rpm: Option<f64>,
    /// Case pressure at the soak, kPa gauge.
    pub case_drain_kpa: Option<f64>,
    /// Highest unloaded speed at temperatures from the gate up.
    pub speed_ladder: Vec<SpeedStep>,
    /// Why figures are missing.
    pub why: Option<&'static str>,
}

/// One step of the speed ladder.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SpeedStep {
    /// Oil at the suction, °C.
    pub oil_c: f64,
    /// Highest speed, rpm.
    pub speed_max_rpm: f64,
}

/// Warming by circulation in neutral.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Circulation {
    /// Time from the mixed temperature to the work floor, s.
    pub time_s: Option<f64>,
    /// Temperature it ends at, °C.
    pub steady_c: Option<f64>,
    /// Why a figure is missing, or what it means.
    pub why: Option<&'static str>,
}

/// The first turn at the gate, °C, with the hottest oil that can meet the pump, °C.
pub(super) fn first_turn(
    setup: &Setup<'_>,
    gate: Option<f64>,
    work_floor: Option<f64>,
    hottest: Option<f64>,
) -> FirstTurn {
    let pump = &setup.case.pump;
    let mut turn = FirstTurn {
        pump_difference_k: Some(hottest.map_or(0.0, |hottest| hottest - setup.soak_c)),
        ..FirstTurn::default()
    };
    let high = setup.oil.estimate(setup.soak_c).high;
    let rho = setup.bulk.density(setup.soak_c);
    let mu = high.map(|nu| nu * 1e-6 * rho);
    if mu.is_none() {
        turn.why = Some("no viscosity so near the pour point: the hose may hold gel");
    }
    if let (Some(drain), Some(mu)) = (&setup.case.case_drain, mu) {
        turn.case_drain_kpa = Some(pump::case_drain_kpa(
            mu,
            drain.length.as_m(),
            drain.bore.as_mm() / 1000.0,
            drain.flow.as_litres_per_min() / 60_000.0,
        ));
    }
    let Some(line) = &setup.case.suction else {
        turn.why = Some("the suction line is not given");
        return turn;
    };
    let least = pump.inlet_start_min.as_kpa();
    let start_rpm = pump.start_speed.as_rpm();
    let dp = (setup.atmosphere_kpa - least) * 1000.0 + rho * GRAVITY * line.head_m();
    if let Some(mu) = mu {
        if dp > 0.0 {
            turn.hose_clearing_s =
                Some(pump::clearing_time(mu, line.length_m(), dp, line.bore_m()));
            let velocity = setup.flow_per_rpm * start_rpm / line.area_m2();
            turn.hose_fill = (velocity > 0.0)
                .then(|| pump::initial_fill(mu, line.length_m(), dp, line.bore_m(), velocity));
        } else {
            turn.why = Some("the air pressure leaves nothing over the pump's limit");
        }
    }
    let Some(inlet) = &setup.inlet else {
        turn.why = Some("the pump displacement is not given");
        return turn;
    };
    let Some(gate) = gate else {
        turn.why = Some("there is no start floor");
        return turn;
    };
    let speed_at = |t: f64| {
        inlet.highest_speed(
            setup.flow_per_rpm,
            setup.viscosity(Edge::Thick, t),
            setup.bulk.density(t),
            least,
            pump.work_speed.as_rpm(),
        )
    };
    turn.vacuum_at_gate_kpa =
        setup.inlet_kpa(Edge::Thick, start_rpm, gate).map(|inlet| setup.atmosphere_kpa - inlet);
    let to = work_floor.unwrap_or(setup.case.policy.limits.search_to_c).max(gate);
    let mut t = gate;
    while t <= to + 1e-9 {
        let Some(speed) = speed_at(t) else { break };
        turn.speed_ladder.push(SpeedStep { oil_c: t, speed_max_rpm: speed });
        if speed >= pump.work_speed.as_rpm() {
            break;
        }
        t = ((t / 5.0).floor() + 1.0) * 5.0;
    }
    // Thinning oil may turn turbulent and cost speed again: a step holds from there up.
    let mut least = f64::INFINITY;
    for step in turn.speed_ladder.iter_mut().rev() {
        least = least.min(step.speed_max_rpm);
        step.speed_max_rpm = least;
    }
    turn.speed_max_rpm = turn.speed_ladder.first().map(|step| step.speed_max_rpm);
    turn
}

/// Running in neutral: the whole circuit, what warms it and what it loses.
pub(super) struct Running {
    capacity: HeatCapacity,
    heat_w: f64,
    loss_w_k: f64,
    air_c: f64,
    /// Tank and cold rest mixed, °C.
    pub(super) mixed_c: f64,
}

impl Running {
    /// Or why it cannot be known.
    pub(super) fn new(
        setup: &Setup<'_>,
        tank: &Tank<'_>,
        tank_c: f64,
        start_floor: Option<f64>,
    ) -> Result<Self, &'static str> {
        let (case, policy) = (setup.case, &setup.case.policy.heat);
        let neutral = case.pump.neutral.ok_or("what the oil does in neutral is not given")?;
        let pressure = match neutral {
            Neutral::ClosedLoop => case.pump.charge_pressure,
            Neutral::OpenCentre | Neutral::LoadSensing => case.circuit.standby_pressure,
        };
        let pressure = pressure.ok_or("the pressure in neutral is not given")?;
        if setup.flow_per_rpm <= 0.0 {
            return Err("the pump displacement is not given");
        }
        let share = match neutral {
            Neutral::LoadSensing => policy.load_sensing_share,
            Neutral::OpenCentre | Neutral::ClosedLoop => 1.0,
        };
        let flow = setup.flow_per_rpm * case.pump.start_speed.as_rpm();
        let heat_w = heat::circulation_heat_w(share, flow, pressure.as_kpa() * 1000.0);
        let loss_w_k = match (case.circuit.heat_loss, start_floor) {
            (Some(given), _) => given.as_w_per_k(),
            (None, Some(floor)) => {
                let at = floor.max(setup.air_c + 10.0);
                policy.circuit_loss_factor * tank.loss.ua(at)
            }
            (None, None) => return Err("there is no start floor"),
        };
        let (warm, cold) = (tank.capacity.at(15.0), tank.rest.at(15.0));
        let mixed_c = heat::mixed_c(warm, tank_c, cold, setup.soak_c);
        let capacity = tank.capacity.plus(&tank.rest);
        Ok(Self { capacity, heat_w, loss_w_k, air_c: setup.air_c, mixed_c })
    }

    /// Where it ends, °C.
    pub(super) fn steady_c(&self) -> f64 {
        heat::circulation_steady_c(self.heat_w, self.loss_w_k, self.air_c)
    }

    /// Time from the mixed temperature to another, s; `None` where it never gets there.
    pub(super) fn time_s(&self, to_c: f64) -> Option<f64> {
        let (heat, loss) = (self.heat_w, self.loss_w_k);
        heat::circulation_time_s(&self.capacity, heat, loss, self.air_c, self.mixed_c, to_c)
    }
}

/// Circulation from the mixed temperature to the work floor.
pub(super) fn circulation(
    setup: &Setup<'_>,
    tank: &Tank<'_>,
    tank_c: f64,
    start_floor: Option<f64>,
    work_floor: Option<f64>,
) -> Circulation {
    let running = match Running::new(setup, tank, tank_c, start_floor) {
        Ok(running) => running,
        Err(why) => return Circulation { why: Some(why), ..Circulation::default() },
    };
    let steady = running.steady_c();
    let Some(work_floor) = work_floor else {
        return Circulation {
            steady_c: Some(steady),
            time_s: None,
            why: Some("there is no work floor"),
        };
    };
    let time = running.time_s(work_floor);
    Circulation {
        time_s: time,
        steady_c: Some(steady),
        why: match time {
            None => Some("will not warm at idle: work the functions gently, one after the other"),
            Some(time) if time > 3600.0 => {
                Some("over an hour at idle: work the functions gently, one after the other")
            }
            Some(_) => None,
        },
    }
}
