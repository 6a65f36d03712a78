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

    /// The viscosity, mm²/s, at which a flow in m³/s loses most on its way from turbulent to laminar.
    ///
    /// Between Reynolds numbers of about 3500 and 2000 the friction factor falls as oil thickens, so
    /// a thicker oil may lose less. A limit that is to hold for every thinner oil too is held against
    /// the pressure here as well.
    #[must_use]
    pub fn hump_viscosity(&self, q: f64) -> f64 {
        let per_nu = q / self.line.area * self.line.bore * 1e6;
        // Golden section in the logarithm of the Reynolds number; density plays no part.
        let loss = |ln_re: f64| -self.pressure_kpa(q, per_nu / ln_re.exp(), 870.0);
        let ratio = (5_f64.sqrt() - 1.0) / 2.0;
        let (mut a, mut b) = (2000_f64.ln(), 10_000_f64.ln());
        let (mut c, mut d) = (b - ratio * (b - a), a + ratio * (b - a));
        let (mut fc, mut fd) = (loss(c), loss(d));
        while b - a > 1e-3 {
            if fc > fd {
                (b, d, fd) = (d, c, fc);
                c = b - ratio * (b - a);
                fc = loss(c);
            } else {
                (a, c, fc) = (c, d, fd);
                d = a + ratio * (b - a);
                fd = loss(d);
            }
        }
        per_nu / f64::midpoint(a, b).exp()
    }

    /// The largest viscosity, mm²/s, that keeps the port at `least_kpa` or more, as every thinner oil
    /// does; `None` where not even 0.21 mm²/s does.
    #[must_use]
    pub fn largest_viscosity(&self, q: f64, rho: f64, least_kpa: f64) -> Option<f64> {
        let margin = |ln_nu: f64| self.pressure_kpa(q, ln_nu.exp(), rho) - least_kpa;
        let (thin, thick) = (0.21_f64.ln(), 2e7_f64.ln());
        if margin(thin) < 0.0 {
            return None;
        }
        let hump = self.hump_viscosity(q).ln().max(thin);
        let (from, to) = if margin(hump) < 0.0 { (thin, hump) } else { (hump, thick) };
        if margin(to) >= 0.0 {
            return Some(to.exp());
        }
        solve::root(margin, from, to, 1e-12).map(f64::exp)
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
