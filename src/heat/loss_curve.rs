//! The loss of a tank over temperature, from films evaluated once.

use super::tank_loss::TankLoss;
use crate::solve;

/// Steps between nodes over the whole of a loss curve.
const STEPS: f64 = 27.0;
/// Least number of nodes of a piece; slopes are taken over five.
const LEAST_NODES: usize = 6;

/// The loss of a tank over temperature: the films are evaluated once, at fixed nodes.
///
/// Between nodes UA is a cubic with matching slopes. The nodes lie evenly in the cube root of the
/// difference to the air, in which a natural-convection film is nearly a straight line. The curve is
/// cut where the oil film passes a measured point of the viscosity, which is a kink.
#[derive(Debug, Clone)]
pub struct LossCurve {
    air_c: f64,
    span_k: f64,
    /// From the air up; never empty.
    pieces: Vec<Piece>,
}

/// A piece without a kink, from one cube root of `(T - air)/span` to another.
#[derive(Debug, Clone)]
struct Piece {
    from: f64,
    to: f64,
    /// UA, W/K, and its slope per node, evenly from end to end.
    nodes: Vec<(f64, f64)>,
}

impl LossCurve {
    /// Evaluates a tank's loss from its air to `top_c`, both in °C.
    #[must_use]
    pub fn new(loss: &TankLoss<'_>, top_c: f64) -> Self {
        let air_c = loss.air_c();
        let span_k = (top_c - air_c).max(1.0);
        if loss.is_fixed() {
            let nodes = vec![(loss.ua(air_c + span_k), 0.0)];
            return Self { air_c, span_k, pieces: vec![Piece { from: 0.0, to: 1.0, nodes }] };
        }
        let mut ends: Vec<f64> = loss
            .kinks(air_c + span_k)
            .map(|kink| ((kink - air_c) / span_k).cbrt())
            .chain([0.0, 1.0])
            .collect();
        ends.sort_by(f64::total_cmp);
        ends.dedup_by(|b, a| *b - *a < 1e-6);
        let pieces = ends.iter().zip(ends.iter().skip(1));
        let pieces = pieces.map(|(from, to)| Piece::new(loss, span_k, *from, *to)).collect();
        Self { air_c, span_k, pieces }
    }

    /// Air temperature, °C.
    #[must_use]
    pub const fn air_c(&self) -> f64 {
        self.air_c
    }

    /// Hottest temperature of the curve, °C. Above it UA is held, which is too little: ask within.
    #[must_use]
    pub fn top_c(&self) -> f64 {
        self.air_c + self.span_k
    }

    /// Loss per kelvin over the air at an oil temperature in °C, W/K.
    #[must_use]
    pub fn ua(&self, celsius: f64) -> f64 {
        let s = ((celsius - self.air_c) / self.span_k).clamp(0.0, 1.0).cbrt();
        let piece = self.pieces.iter().find(|piece| s <= piece.to).or(self.pieces.last());
        // Invariant: a curve has a piece.
        piece.map_or(0.0, |piece| piece.at(s))
    }

    /// Loss at an oil temperature in °C, W: the power that holds it there. Zero at or below the air.
    #[must_use]
    pub fn loss_w(&self, celsius: f64) -> f64 {
        if celsius <= self.air_c { 0.0 } else { self.ua(celsius) * (celsius - self.air_c) }
    }

    /// The temperature, °C, at which the loss times `loss_factor` eats up a power in W; `None` over
    /// the top of the curve: ask [`steady_c`](super::steady_c) then.
    #[must_use]
    pub fn steady_c(&self, power_w: f64, loss_factor: f64) -> Option<f64> {
        if power_w <= 0.0 {
            return Some(self.air_c);
        }
        let over = |t: f64| loss_factor * self.loss_w(t) - power_w;
        solve::root(over, self.air_c, self.top_c(), 1e-6)
    }
}

impl Piece {
    fn new(loss: &TankLoss<'_>, span_k: f64, from: f64, to: f64) -> Self {
        #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "0 to STEPS")]
        let count = LEAST_NODES.max((STEPS * (to - from)).round() as usize + 1);
        let step = (to - from) / (count - 1) as f64;
        // From the hot end down, each node with its neighbours' surface as a first guess.
        let (mut guess, mut drift) = (None, 0.0);
        let mut ua = vec![0.0; count];
        for (node, ua) in ua.iter_mut().enumerate().rev() {
            let s = from + step * node as f64;
            // The film of a vanishing difference is that of a very small one.
            let difference = (span_k * s * s * s).max(1e-6);
            let ahead = guess.map(|share: f64| (share + drift).clamp(0.0, 1.0));
            let share;
            (*ua, share) = loss.ua_from(loss.air_c() + difference, ahead);
            drift = guess.map_or(0.0, |last| share - last);
            guess = Some(share);
        }
        Self { from, to, nodes: with_slopes(&ua) }
    }

    fn at(&self, s: f64) -> f64 {
        let steps = self.nodes.len() - 1;
        let x = ((s - self.from) / (self.to - self.from) * steps as f64).max(0.0);
        #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "not negative")]
        let first = (x as usize).min(steps.saturating_sub(1));
        let t = x - first as f64;
        match self.nodes.get(first..) {
            // Cubic through both ends with the slopes there.
            Some([(a, slope_a), (b, slope_b), ..]) => {
                let (rise, u) = (b - a, 1.0 - t);
                a + t * rise + t * u * (u * (slope_a - rise) - t * (slope_b - rise))
            }
            Some([(held, _)]) => *held,
            _ => 0.0,
        }
    }
}

/// Each value with its slope per node: that of the curve of fourth order through five neighbours.
fn with_slopes(ua: &[f64]) -> Vec<(f64, f64)> {
    // Weights times 12, for the first, second and middle one of the five; mirrored at the hot end.
    const FIRST: [f64; 5] = [-25.0, 48.0, -36.0, 16.0, -3.0];
    const SECOND: [f64; 5] = [-3.0, -10.0, 18.0, -6.0, 1.0];
    const MIDDLE: [f64; 5] = [1.0, -8.0, 0.0, 8.0, -1.0];
    let weighted = |weights: [f64; 5], from: usize| {
        weights.iter().zip(ua.iter().skip(from)).map(|(w, ua)| w * ua).sum::<f64>() / 12.0
    };
    let mirrored = |weights: [f64; 5]| {
        -weights.iter().zip(ua.iter().rev()).map(|(w, ua)| w * ua).sum::<f64>() / 12.0
    };
    let slope = |i: usize| match (i, ua.len() - 1 - i) {
        (0, _) => weighted(FIRST, 0),
        (1, _) => weighted(SECOND, 0),
        (_, 0) => mirrored(FIRST),
        (_, 1) => mirrored(SECOND),
        _ => weighted(MIDDLE, i - 2),
    };
    ua.iter().enumerate().map(|(i, ua)| (*ua, slope(i))).collect()
}
