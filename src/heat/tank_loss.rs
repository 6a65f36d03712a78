//! Heat loss of the tank: from cool-down readings, a given U value, or films.

use super::film::{self, OilFilm};
use super::policy::HeatPolicy;
use crate::pump::words;
use crate::solve;
use crate::source::{Method, Source};

words! {
    /// How the tank stands in the wind.
    Exposure: "exposure" {
        Enclosed = "enclosed",
        OpenFrame = "open-frame",
        Exposed = "exposed",
    }
}

/// Loss from two readings of one night.
pub static COOLDOWN: Method = Method {
    name: "heat loss from two cool-down readings, UA = C ln((T0 - Ta)/(T1 - Ta))/Δt",
    source: Source::quoted("lumped cooling of a body, Incropera et al., chapter 5"),
};

/// Loss from a given U value.
pub static GIVEN_U: Method = Method {
    name: "given heat loss per area",
    source: Source::judgement("the figure given in the case"),
};

/// Loss from films.
pub static FILMS: Method = Method {
    name: "films inside and outside, insulation, wind along the tank and radiation; ±40 %",
    source: Source::quoted("Churchill and Chu (1975); Incropera et al., chapters 7 and 9 (memory)"),
};

impl Exposure {
    /// Share of the wind that reaches the tank.
    #[must_use]
    pub const fn wind_share(self, policy: &HeatPolicy) -> f64 {
        match self {
            Self::Enclosed => policy.wind_enclosed,
            Self::OpenFrame => policy.wind_open_frame,
            Self::Exposed => policy.wind_exposed,
        }
    }
}

/// Where the solution of a film starts: the share of the difference outside the tank.
const GUESS: f64 = 0.5;

/// What the films need to know of a tank. Lengths in m, wind in m/s as it reaches the tank.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Walls {
    /// Height wetted by oil.
    pub height: f64,
    /// Length along the wind.
    pub length: f64,
    /// Wind at the tank.
    pub wind: f64,
    /// Resistance of the insulation, m²·K/W.
    pub insulation: f64,
    /// Emissivity of the outside.
    pub emissivity: f64,
}

/// How the loss is arrived at.
#[derive(Debug, Clone, Copy)]
enum Way<'a> {
    /// UA, W/K, and the method.
    Fixed(f64, &'static Method),
    Films(Walls, OilFilm<'a>, f64),
}

/// Heat loss of a tank in air of one temperature.
#[derive(Debug, Clone, Copy)]
pub struct TankLoss<'a> {
    way: Way<'a>,
    area: f64,
    air_c: f64,
}

/// UA, W/K, from two readings: heat capacity in J/K, temperatures in °C, time in s.
#[must_use]
pub fn cooldown_ua(heat_capacity: f64, from: f64, to: f64, air: f64, over_s: f64) -> f64 {
    heat_capacity / (over_s / ((from - air) / (to - air)).ln())
}

impl<'a> TankLoss<'a> {
    /// From UA in W/K that cool-down readings gave, the surface in m² and the air in °C.
    #[must_use]
    pub const fn from_cooldown(ua: f64, area: f64, air_c: f64) -> Self {
        Self { way: Way::Fixed(ua, &COOLDOWN), area, air_c }
    }

    /// From a U value in W/(m²·K), the surface in m² and the air in °C.
    #[must_use]
    pub const fn from_u_value(u: f64, area: f64, air_c: f64) -> Self {
        Self { way: Way::Fixed(u * area, &GIVEN_U), area, air_c }
    }

    /// From films. `wetted_share` is the share of the surface that loses heat as a wetted wall does.
    #[must_use]
    pub const fn from_films(
        walls: Walls,
        oil: OilFilm<'a>,
        wetted_share: f64,
        area: f64,
        air_c: f64,
    ) -> Self {
        Self { way: Way::Films(walls, oil, wetted_share), area, air_c }
    }

    /// Air temperature, °C.
    #[must_use]
    pub const fn air_c(&self) -> f64 {
        self.air_c
    }

    /// The method used.
    #[must_use]
    pub const fn method(&self) -> &'static Method {
        match self.way {
            Way::Fixed(_, method) => method,
            Way::Films(..) => &FILMS,
        }
    }

    /// U at an oil temperature in °C, W/(m²·K), for the whole surface alike.
    ///
    /// `1/U = 1/h_in + d/k + 1/h_out`, wall temperatures from the heat balance.
    #[must_use]
    pub fn u_value(&self, oil_c: f64) -> f64 {
        match self.way {
            Way::Fixed(ua, _) => ua / self.area,
            Way::Films(walls, oil, _) => film_u(walls, oil, oil_c, self.air_c, GUESS).0,
        }
    }

    /// Loss per kelvin over the air, W/K, at several oil temperatures in °C, each solved from the
    /// one before.
    pub(super) fn ua_along(&self, temperatures: impl Iterator<Item = f64>, out: &mut [f64]) {
        // Each guess goes on from the two nodes before it.
        let (mut last, mut guess) = (None, GUESS);
        for (ua, oil_c) in out.iter_mut().zip(temperatures) {
            *ua = match self.way {
                Way::Fixed(ua, _) => ua,
                Way::Films(walls, oil, share) => {
                    let (u, outside) = film_u(walls, oil, oil_c, self.air_c, guess);
                    guess = (2.0 * outside - last.unwrap_or(outside)).clamp(1e-3, 1.0);
                    last = Some(outside);
                    share * u * self.area
                }
            };
        }
    }

    /// Loss per kelvin over the air at an oil temperature in °C, W/K.
    #[must_use]
    pub fn ua(&self, oil_c: f64) -> f64 {
        match self.way {
            Way::Fixed(ua, _) => ua,
            Way::Films(_, _, share) => share * self.u_value(oil_c) * self.area,
        }
    }

    /// Loss at an oil temperature in °C, W; zero at or below the air.
    #[must_use]
    pub fn loss_w(&self, oil_c: f64) -> f64 {
        if oil_c <= self.air_c {
            return 0.0;
        }
        self.ua(oil_c) * (oil_c - self.air_c)
    }
}

/// U and the share of the temperature difference that lies outside the tank, started from a guess of
/// that share.
fn film_u(walls: Walls, oil: OilFilm<'_>, oil_c: f64, air_c: f64, guess: f64) -> (f64, f64) {
    let span = oil_c - air_c;
    if span <= 1e-9 {
        return (0.0, guess);
    }
    // With the surface at `share` of the difference over the air: U of the three resistances in
    // series, and the share they give.
    let step = |share: f64| {
        let surface_c = air_c + share * span;
        let out = film::outside(
            surface_c,
            air_c,
            walls.wind,
            walls.height,
            walls.length,
            walls.emissivity,
        );
        let wall_c = (surface_c + out * share * span * walls.insulation).min(oil_c);
        let inside = oil.wall(oil_c, wall_c, walls.height);
        let u = 1.0 / (1.0 / inside + walls.insulation + 1.0 / out);
        (u, u / out)
    };
    // Secant steps on the fixed point; it is flat, so a few are enough.
    let (mut x0, mut x1) = (guess, step(guess).1);
    let mut f0 = x1 - x0;
    for _ in 0..20 {
        let (u, next) = step(x1);
        let f1 = next - x1;
        if f1.abs() < 1e-7 {
            return (u, x1);
        }
        let slope = (f1 - f0) / (x1 - x0);
        let x2 = if slope < -1e-3 { x1 - f1 / slope } else { next };
        (x0, f0) = (x1, f1);
        x1 = x2.clamp(1e-6, 1.0);
    }
    // Did not settle: halve instead.
    let share = solve::root(|x| step(x).1 - x, 1e-6, 1.0, 1e-10).unwrap_or(f64::NAN);
    (step(share).0, share)
}
