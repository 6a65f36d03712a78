//! Heat loss of the tank: from cool-down readings, a given U value, or films.

use super::film::{self, OilFilm};
use super::policy::HeatPolicy;
use crate::solve;
use crate::source::{Method, Source};
use crate::words::words;

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
    /// Walls, the oil at them, and the share of the surface that counts as wetted.
    Films(Walls, OilFilm<'a>, f64),
}

/// Heat loss of a tank in air of one temperature.
///
/// Invariant: the loss is zero at or below the air and never falls as the oil warms.
#[derive(Debug, Clone, Copy)]
pub struct TankLoss<'a> {
    way: Way<'a>,
    area: f64,
    air_c: f64,
    /// Resistance of insulation put on afterwards, m²·K/W.
    blanket: f64,
}

/// UA, W/K, from two readings: heat capacity in J/K, temperatures in °C, time in s.
///
/// `UA = C ln((T0 - Ta)/(T1 - Ta))/Δt`
///
/// Readings that did not fall, or fell to the air, are a mistake in the reading and give a figure that
/// is not positive or not finite: refuse them where they are read.
#[must_use]
pub fn cooldown_ua(heat_capacity: f64, from: f64, to: f64, air: f64, over_s: f64) -> f64 {
    heat_capacity / (over_s / ((from - air) / (to - air)).ln())
}

impl<'a> TankLoss<'a> {
    /// From UA in W/K that cool-down readings gave, the surface in m² and the air in °C.
    #[must_use]
    pub const fn from_cooldown(ua: f64, area: f64, air_c: f64) -> Self {
        Self { way: Way::Fixed(ua, &COOLDOWN), area, air_c, blanket: 0.0 }
    }

    /// From a U value in W/(m²·K), the surface in m² and the air in °C.
    #[must_use]
    pub const fn from_u_value(u: f64, area: f64, air_c: f64) -> Self {
        Self { way: Way::Fixed(u * area, &GIVEN_U), area, air_c, blanket: 0.0 }
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
        Self { way: Way::Films(walls, oil, wetted_share), area, air_c, blanket: 0.0 }
    }

    /// The same tank with more insulation round it: thickness in m, conductivity in W/(m·K).
    ///
    /// `1/U' = 1/U + d/k`, the films as they were without it: they would weaken a little too, so the
    /// loss comes out on the safe side.
    #[must_use]
    pub fn extra_insulation(self, thickness: f64, conductivity: f64) -> Self {
        Self { blanket: self.blanket + thickness / conductivity, ..self }
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

    /// U at an oil temperature in °C, W/(m²·K), for the whole surface alike: UA over the surface where
    /// cool-down readings gave UA.
    ///
    /// `1/U = 1/h_in + d/k + 1/h_out`, wall temperatures from the heat balance. Zero at or below the
    /// air for films.
    #[must_use]
    pub fn u_value(&self, oil_c: f64) -> f64 {
        self.u_value_from(oil_c, None).0
    }

    /// U, and where the outer surface stands between air (0) and oil (1), which is a guess to start
    /// from for a temperature close by.
    fn u_value_from(&self, oil_c: f64, guess: Option<f64>) -> (f64, f64) {
        let (u, surface) = match self.way {
            Way::Fixed(ua, _) => (ua / self.area, 0.0),
            Way::Films(walls, oil, _) => film_u(walls, oil, oil_c, self.air_c, guess),
        };
        // Written so that a tank without loss stays without.
        (u / (1.0 + u * self.blanket), surface)
    }

    /// Loss per kelvin over the air at an oil temperature in °C, W/K.
    #[must_use]
    pub fn ua(&self, oil_c: f64) -> f64 {
        self.ua_from(oil_c, None).0
    }

    /// As [`Self::ua`], with the guess of a neighbour; hands on its own.
    pub(super) fn ua_from(&self, oil_c: f64, guess: Option<f64>) -> (f64, f64) {
        let (u, surface) = self.u_value_from(oil_c, guess);
        let share = match self.way {
            Way::Fixed(..) => 1.0,
            Way::Films(_, _, share) => share,
        };
        (share * u * self.area, surface)
    }

    /// Loss at an oil temperature in °C, W; zero at or below the air.
    #[must_use]
    pub fn loss_w(&self, oil_c: f64) -> f64 {
        if oil_c <= self.air_c {
            return 0.0;
        }
        self.ua(oil_c) * (oil_c - self.air_c)
    }

    /// Oil temperatures, °C, up to `top_c`, at which the oil film has the temperature of a measured
    /// point of the viscosity with a line on either side: U has a kink there.
    pub(super) fn kinks(&self, top_c: f64) -> impl Iterator<Item = f64> + '_ {
        /// Nearer than this a kink need not be known, K.
        const NEAR_K: f64 = 0.1;
        let films = match self.way {
            Way::Films(walls, oil, _) => Some((walls, oil)),
            Way::Fixed(..) => None,
        };
        let points = films.map_or(&[][..], |(_, oil)| oil.curve.points());
        let inner = points.get(1..points.len().saturating_sub(1)).unwrap_or_default();
        inner.iter().filter_map(move |(at, _)| {
            let (walls, oil) = films?;
            let mut guess = None;
            let mut film_c = |oil_c: f64| {
                let (u, share) = film_u(walls, oil, oil_c, self.air_c, guess);
                guess = Some(share);
                let span = oil_c - self.air_c;
                let wall_c = self.air_c + span * (share + u * walls.insulation);
                f64::midpoint(oil_c, wall_c)
            };
            solve::root(|oil_c| film_c(oil_c) - at, self.air_c, top_c, NEAR_K)
        })
    }

    /// Whether U changes with temperature.
    pub(super) const fn is_fixed(&self) -> bool {
        matches!(self.way, Way::Fixed(..))
    }
}

/// The balance counts as found when the next step would move no wall by more than this, K.
const BALANCED_K: f64 = 1e-4;

/// U through the films, W/(m²·K), and where the outer surface stands between air (0) and oil (1).
///
/// With the coefficients at a surface temperature the resistances in a row say where the surface would
/// stand; where it stands there already, the heat is in balance. The secant method on that difference
/// needs about three evaluations; the root stays between brackets, as there is one only: more heat
/// leaves and less arrives as the surface warms.
fn film_u(
    walls: Walls,
    oil: OilFilm<'_>,
    oil_c: f64,
    air_c: f64,
    guess: Option<f64>,
) -> (f64, f64) {
    let span = oil_c - air_c;
    if span <= 1e-9 {
        return (0.0, guess.unwrap_or(0.5));
    }
    // U, the share at which the surface would stand, and how far the oil's own wall moves with the
    // surface, from the coefficients at a share.
    let balance = |share: f64| {
        let surface_c = air_c + share * span;
        let h_out = film::outside(
            surface_c,
            air_c,
            walls.wind,
            walls.height,
            walls.length,
            walls.emissivity,
        );
        // The oil's own wall is warmer by the drop over the insulation, never than the oil.
        let wall_c = (surface_c + h_out * share * span * walls.insulation).min(oil_c);
        let h_in = oil.wall(oil_c, wall_c, walls.height);
        let resistance = 1.0 / h_in + walls.insulation + 1.0 / h_out;
        (1.0 / resistance, 1.0 / (h_out * resistance), 1.0 + h_out * walls.insulation)
    };
    let (mut low, mut high) = (0.0, 1.0);
    let mut share = guess.unwrap_or(0.5);
    let (mut u, mut next, mut lever) = balance(share);
    let mut miss = next - share;
    for _ in 0..60 {
        if miss > 0.0 {
            low = share;
        } else {
            high = share;
        }
        let inside = if next > low && next < high { next } else { f64::midpoint(low, high) };
        if (inside - share).abs() * span * lever < BALANCED_K {
            break;
        }
        let (last_share, last_miss) = (share, miss);
        share = inside;
        let would;
        (u, would, lever) = balance(share);
        miss = would - share;
        let slope = (miss - last_miss) / (share - last_share);
        next = share - miss / slope;
    }
    (u, share)
}
