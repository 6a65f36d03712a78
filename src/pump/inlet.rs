//! The inlet pressure balance and its inverses.
//!
//! The pressure at the pump port is what the atmosphere and the oil column give, less friction,
//! fittings, velocity head and strainer. The flow is displacement times speed: what leaks back was
//! drawn in first.

use super::suction::{SuctionLine, friction_factor};
use crate::solve;
use crate::source::{Method, Source};

/// The inlet balance.
pub static INLET_BALANCE: Method = Method {
    name: "inlet pressure balance: atmosphere + head - pipe (Churchill) - fittings (2-K) - velocity head - strainer",
    source: Source::quoted(
        "S. W. Churchill, Chemical Engineering 84 (1977) 24; W. B. Hooper, Chemical Engineering, 24 August 1981",
    ),
};

/// Standard gravity, m/s².
pub(crate) const GRAVITY: f64 = 9.806_65;

/// A suction line with the pressure over its oil.
#[derive(Debug, Clone, PartialEq)]
pub struct Inlet {
    line: SuctionLine,
    tank_kpa: f64,
}

/// The parts of the balance, all in kPa.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Balance {
    /// Absolute pressure over the oil.
    pub tank: f64,
    /// Oil column over the port.
    pub head: f64,
    /// Friction in the hose.
    pub pipe: f64,
    /// Fittings and entrance.
    pub fittings: f64,
    /// Velocity head.
    pub velocity: f64,
    /// Strainer.
    pub strainer: f64,
    /// Absolute pressure at the port: tank + head less the rest. Under zero: the pump starves.
    pub pressure: f64,
}

impl Inlet {
    /// A line under an absolute tank pressure in kPa.
    #[must_use]
    pub const fn new(line: SuctionLine, tank_kpa: f64) -> Self {
        Self { line, tank_kpa }
    }

    /// The line.
    #[must_use]
    pub const fn line(&self) -> &SuctionLine {
        &self.line
    }

    /// Reynolds number in the hose: flow in m³/s, viscosity in mm²/s.
    #[must_use]
    pub fn reynolds(&self, q: f64, nu: f64) -> f64 {
        q / self.line.area * self.line.bore / (nu * 1e-6)
    }

    /// The balance: flow in m³/s, viscosity in mm²/s, density in kg/m³.
    ///
    /// `p = p_tank + ρ g h - ½ ρ V² (α + f L/D + K1/Re + K∞) - Δp_strainer`.
    #[must_use]
    pub fn balance(&self, q: f64, nu: f64, rho: f64) -> Balance {
        let line = &self.line;
        let v = q / line.area;
        let re = self.reynolds(q, nu);
        let dynamic = 0.5 * rho * v * v;
        let pipe = dynamic * friction_factor(re, line.roughness) * line.length / line.bore;
        let fittings = dynamic * (line.k1 / re + line.kinf);
        let velocity = dynamic * line.velocity_factor;
        let strainer = (line.strainer * nu * 1e-6 * rho * q).min(line.strainer_most);
        let head = rho * GRAVITY * line.head;
        let pressure = self.tank_kpa + (head - pipe - fittings - velocity - strainer) / 1000.0;
        Balance {
            tank: self.tank_kpa,
            head: head / 1000.0,
            pipe: pipe / 1000.0,
            fittings: fittings / 1000.0,
            velocity: velocity / 1000.0,
            strainer: strainer / 1000.0,
            pressure,
        }
    }

    /// Absolute pressure at the port, kPa: see [`Inlet::balance`].
    #[must_use]
    pub fn pressure_kpa(&self, q: f64, nu: f64, rho: f64) -> f64 {
        self.balance(q, nu, rho).pressure
    }

    /// A pressure, kPa, that the port never falls under while the Reynolds number is `re` or more and
    /// the density lies between two values; `None` where the hose is too rough to say.
    ///
    /// Over Re 1500 the friction factor of a hose of relative roughness 0.01 and less stays under
    /// 0.06 (Churchill 1977); fittings and strainer lose most at the least Reynolds number.
    #[must_use]
    pub fn lower_bound_kpa(&self, q: f64, re: f64, rho_least: f64, rho_most: f64) -> Option<f64> {
        let line = &self.line;
        if line.roughness > 0.01 || re < 1500.0 {
            return None;
        }
        let v = q / line.area;
        let nu = v * line.bore / re;
        let loss = 0.06 * line.length / line.bore + line.k1 / re + line.kinf + line.velocity_factor;
        let strainer = (line.strainer * nu * rho_most * q).min(line.strainer_most);
        let rho_head = if line.head >= 0.0 { rho_least } else { rho_most };
        let lost = 0.5 * rho_most * v * v * loss + strainer;
        Some(self.tank_kpa + (rho_head * GRAVITY * line.head - lost) / 1000.0)
    }

    /// The largest viscosity, mm²/s, up to which every thinner oil in laminar flow keeps the port at
    /// `least_kpa` or more; `None` where none does.
    ///
    /// The search goes up from the viscosity at Re 2000, or from 0.21 mm²/s where that is laminar.
    #[must_use]
    pub fn largest_viscosity(&self, q: f64, rho: f64, least_kpa: f64) -> Option<f64> {
        let margin = |ln_nu: f64| self.pressure_kpa(q, ln_nu.exp(), rho) - least_kpa;
        let laminar_from = (self.reynolds(q, 1.0) / 2000.0).max(0.21).ln();
        if margin(laminar_from) < 0.0 {
            return None;
        }
        let to = 2e7_f64.ln();
        if margin(to) >= 0.0 {
            return Some(2e7);
        }
        solve::root(margin, laminar_from, to, 1e-12).map(f64::exp)
    }

    /// The highest speed, rpm, up to `cap`, such that it and every slower one keeps the port at
    /// `least_kpa` or more; `None` where not even the slowest does. `flow_per_rpm` in m³/s per rpm.
    #[must_use]
    pub fn highest_speed(
        &self,
        flow_per_rpm: f64,
        nu: f64,
        rho: f64,
        least_kpa: f64,
        cap: f64,
    ) -> Option<f64> {
        // Friction only grows with flow, in every regime: one crossing at most.
        let margin = |rpm: f64| self.pressure_kpa(flow_per_rpm * rpm, nu, rho) - least_kpa;
        if margin(cap) >= 0.0 {
            return Some(cap);
        }
        solve::root(margin, 1e-3 * cap, cap, 1e-6 * cap)
    }
}
