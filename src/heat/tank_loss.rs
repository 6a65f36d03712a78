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
            Way::Films(walls, oil, _) => film_u(walls, oil, oil_c, self.air_c),
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

    /// Whether U changes with temperature.
    pub(super) const fn is_fixed(&self) -> bool {
        matches!(self.way, Way::Fixed(..))
    }
}

fn film_u(walls: Walls, oil: OilFilm<'_>, oil_c: f64, air_c: f64) -> f64 {
    let span = oil_c - air_c;
    if span <= 1e-9 {
        return 0.0;
    }
    let outside = |surface_c: f64| {
        film::outside(surface_c, air_c, walls.wind, walls.height, walls.length, walls.emissivity)
    };
    // Heat out of the surface less heat into the wall; rises with the surface temperature.
    let balance = |surface_c: f64| {
        let out = outside(surface_c) * (surface_c - air_c);
        let wall_c = surface_c + out * walls.insulation;
        if wall_c >= oil_c {
            return out;
        }
        out - oil.wall(oil_c, wall_c, walls.height) * (oil_c - wall_c)
    };
    // The ends differ in sign by construction; were there no root, the answer would be no number.
    let surface_c = solve::root(balance, air_c, oil_c, 1e-9 * span).unwrap_or(f64::NAN);
    outside(surface_c) * (surface_c - air_c) / span
}
