//! Warm-up, hold and cool-down of a tank: `C dT/dt = P - loss(T)`.
//!
//! Every question of power and time is answered from the loss curve, without another film.

use super::loss_curve::LossCurve;
use super::tank_loss::TankLoss;
use crate::oil::Bulk;
use crate::source::{Method, Source};

/// Warm-up.
pub static WARM_UP: Method = Method {
    name: "heat balance of the tank, t = ∫ C dT/(P - loss)",
    source: Source::quoted("lumped heating of a body, Incropera et al., chapter 5"),
};

/// Heat capacity of oil and steel together.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct HeatCapacity {
    /// Heat capacity at 0 °C, J/K.
    at_zero: f64,
    /// Its rise, J/K per K.
    slope: f64,
}

impl HeatCapacity {
    /// Oil volume in L (at 15 °C) with its bulk properties, steel in kg with its specific heat in
    /// J/(kg·K): `C = V ρ15 cp(T) + m c`.
    #[must_use]
    pub fn new(litres: f64, bulk: &Bulk, steel_kg: f64, steel_heat: f64) -> Self {
        let oil_kg = litres / 1000.0 * bulk.density_15();
        let zero = bulk.specific_heat(0.0);
        let slope = (bulk.specific_heat(100.0) - zero) / 100.0;
        Self { at_zero: oil_kg * zero + steel_kg * steel_heat, slope: oil_kg * slope }
    }

    /// Of two bodies together.
    #[must_use]
    pub fn plus(&self, other: &Self) -> Self {
        Self { at_zero: self.at_zero + other.at_zero, slope: self.slope + other.slope }
    }

    /// At a temperature in °C, J/K.
    #[must_use]
    pub fn at(&self, celsius: f64) -> f64 {
        self.at_zero + self.slope * celsius
    }
}

/// Pieces of a warm-up; an even number.
const PIECES: usize = 40;

/// A warm-up from one temperature to another: the loss on the way, ready for any power.
#[derive(Debug, Clone)]
pub struct WarmUp {
    /// (temperature °C, heat capacity J/K, loss W) at the joints.
    joints: [(f64, f64, f64); PIECES + 1],
    /// Heat to warm the body, without loss, J.
    heat: f64,
    /// Greatest loss on the way, W.
    worst: f64,
}

impl WarmUp {
    /// From `from_c` to `to_c`, with the loss times `loss_factor`. Nothing to do where `to_c` is no
    /// warmer.
    #[must_use]
    pub fn new(
        curve: &LossCurve,
        capacity: &HeatCapacity,
        from_c: f64,
        to_c: f64,
        loss_factor: f64,
    ) -> Self {
        // Joints lie closer at both ends: where the loss bends most, and where little power is left.
        let rise = (to_c - from_c).max(0.0);
        let mut joints = [(0.0, 0.0, 0.0); PIECES + 1];
        for (at, joint) in joints.iter_mut().enumerate() {
            let s = at as f64 / PIECES as f64;
            let t = from_c + rise * s * s * (3.0 - 2.0 * s);
            *joint = (t, capacity.at(t), loss_factor * curve.loss_w(t));
        }
        let heat = rise * capacity.at(f64::midpoint(from_c, to_c));
        let worst = joints.iter().map(|joint| joint.2).fold(0.0, f64::max);
        Self { joints, heat, worst }
    }

    /// Time in s that a power in W into the oil takes; `None` where the loss eats it up on the way.
    ///
    /// `t = ∫ C dT/(P - loss)`: the loss linear between the joints and integrated in closed form, so
    /// that a power barely over the loss is no trouble, then the error of the straight pieces taken
    /// out by comparing with pieces of twice the length (Richardson).
    ///
    /// # Source
    /// [`WARM_UP`]. L. F. Richardson, Phil. Trans. R. Soc. A 226 (1927) 299 (memory).
    #[must_use]
    pub fn time_s(&self, power_w: f64) -> Option<f64> {
        if self.heat <= 0.0 {
            return Some(0.0);
        }
        // Also false for a power that is not a number.
        if power_w > self.worst { Some(self.time_over_loss(power_w).0) } else { None }
    }

    /// The way there with a power in W into the oil: (s, °C) from the start on. `None` where
    /// [`WarmUp::time_s`] has none, with which its last point agrees.
    ///
    /// # Example
    /// ```
    /// use coldsump::heat::{HeatCapacity, LossCurve, TankLoss, WarmUp};
    /// use coldsump::{oil::Bulk, quantity::Density};
    ///
    /// let loss = TankLoss::from_u_value(7.0, 2.0, -30.0);
    /// let bulk = Bulk::from_density_15(Density::kg_per_m3(870.0)?);
    /// let capacity = HeatCapacity::new(200.0, &bulk, 40.0, 440.0);
    /// let way = WarmUp::new(&LossCurve::new(&loss, 60.0), &capacity, -30.0, 0.0, 1.0);
    /// let path = way.path(1500.0).expect("1500 W is over the loss of 420 W");
    /// assert_eq!(path.first(), Some(&(0.0, -30.0)));
    /// assert_eq!(path.last().map(|end| end.0), way.time_s(1500.0));
    /// # Ok::<(), coldsump::quantity::QuantityError>(())
    /// ```
    #[must_use]
    pub fn path(&self, power_w: f64) -> Option<Vec<(f64, f64)>> {
        let total = self.time_s(power_w)?;
        let mut path = vec![(0.0, self.joints[0].0)];
        if total <= 0.0 {
            return Some(path);
        }
        let mean = |a: &(f64, f64, f64), b: &(f64, f64, f64)| {
            f64::midpoint(a.1, b.1) * (b.0 - a.0) * mean_of_inverse(power_w - a.2, power_w - b.2)
        };
        let mut time = 0.0;
        for pair in self.joints.windows(3).step_by(2) {
            if let [a, b, c] = pair {
                let fine = mean(a, b) + mean(b, c);
                time += fine + (fine - mean(a, c)) / 3.0;
                path.push((time, c.0));
            }
        }
        // The same sum in another order: the ends are one to rounding, and made one.
        if let Some(end) = path.last_mut() {
            end.0 = total;
        }
        Some(path)
    }

    /// Time in s and how fast it falls with power, s/W, for a power over the loss.
    fn time_over_loss(&self, power_w: f64) -> (f64, f64) {
        let (mut fine, mut coarse, mut fall) = (0.0, 0.0, 0.0);
        let mut add = |a: &(f64, f64, f64), b: &(f64, f64, f64), sum: &mut f64| {
            let (left, right) = (power_w - a.2, power_w - b.2);
            let heat = f64::midpoint(a.1, b.1) * (b.0 - a.0);
            *sum += heat * mean_of_inverse(left, right);
            // Mean of 1/N² over a piece on which N is linear.
            fall += heat / (left * right) / 2.0;
        };
        for pair in self.joints.windows(3).step_by(2) {
            if let [a, b, c] = pair {
                add(a, b, &mut fine);
                add(b, c, &mut fine);
                add(a, c, &mut coarse);
            }
        }
        (fine + (fine - coarse) / 3.0, fall)
    }

    /// The smallest power in W into the oil that is through within `time_s`.
    ///
    /// Never less than the loss at the target; that loss itself where the time is endless.
    #[must_use]
    pub fn needed_power_w(&self, time_s: f64) -> f64 {
        if self.heat <= 0.0 {
            return 0.0;
        }
        let bare = self.heat / time_s;
        if self.worst <= 0.0 {
            return bare;
        }
        // The pace 1/t is nearly linear in the power: Newton's method, kept between the power without
        // any loss or at a standstill, and that against the worst loss all the way.
        let pace = time_s.recip();
        let (mut low, mut high) = (bare.max(self.worst), bare + self.worst);
        let mut power = bare + 0.6 * self.worst;
        for _ in 0..100 {
            if !(power > low && power < high) {
                power = f64::midpoint(low, high);
            }
            if power <= low || power >= high {
                break;
            }
            let (time, fall) = self.time_over_loss(power);
            let over = time.recip() - pace;
            if over > 0.0 {
                high = power;
            } else {
                low = power;
            }
            let step = over * time * time / fall;
            power -= step;
            if step.abs() < 1e-9 * power {
                break;
            }
        }
        power.clamp(low, high)
    }
}

/// Mean of 1/N over a piece on which N runs straight from `left` to `right`, both positive.
pub(super) fn mean_of_inverse(left: f64, right: f64) -> f64 {
    let x = (right - left) / left;
    if x.abs() < 1e-3 {
        // The logarithm's series; its next term is under 2e-16.
        let series = 1.0 - x * (1.0 / 2.0 - x * (1.0 / 3.0 - x * (1.0 / 4.0 - x / 5.0)));
        return series / left;
    }
    (right / left).ln() / (right - left)
}

/// Time in s for a tank without heat to cool from one temperature to another, °C; `None` where the
/// air is not cold enough for it, or nothing is lost.
#[must_use]
pub fn cooling_time_s(
    curve: &LossCurve,
    capacity: &HeatCapacity,
    from_c: f64,
    to_c: f64,
    loss_factor: f64,
) -> Option<f64> {
    if to_c <= curve.air_c() || from_c < to_c || loss_factor * curve.loss_w(to_c) <= 0.0 {
        return None;
    }
    // In y = ln(T - Ta) the integrand C/UA is smooth however close the air: Gauss-Legendre's eight
    // points on each of a few pieces.
    let (from, to) = ((from_c - curve.air_c()).ln(), (to_c - curve.air_c()).ln());
    const COOLING_PIECES: usize = 3;
    let half = (from - to) / (2 * COOLING_PIECES) as f64;
    let mut time = 0.0;
    for piece in 0..COOLING_PIECES {
        let middle = to + half * (2 * piece + 1) as f64;
        for (point, weight) in GAUSS {
            for y in [middle - half * point, middle + half * point] {
                let t = curve.air_c() + y.exp();
                time += weight * half * capacity.at(t) / (loss_factor * curve.ua(t));
            }
        }
    }
    Some(time)
}

/// Points and weights of the Gauss-Legendre rule of eight. M. Abramowitz and I. A. Stegun, Handbook
/// of Mathematical Functions (1964), table 25.4 (memory; a test integrates powers with it).
const GAUSS: [(f64, f64); 4] = [
    (0.183_434_642_495_649_8, 0.362_683_783_378_362),
    (0.525_532_409_916_329, 0.313_706_645_877_887_3),
    (0.796_666_477_413_626_7, 0.222_381_034_453_374_5),
    (0.960_289_856_497_536_3, 0.101_228_536_290_376_3),
];

/// The temperature, °C, at which a tank's loss eats up a power in W, also over the top of its curve;
/// `None` above 300 °C, where nothing here holds.
#[must_use]
pub fn steady_c(curve: &LossCurve, loss: &TankLoss<'_>, power_w: f64) -> Option<f64> {
    const TOP_C: f64 = 300.0;
    if let Some(within) = curve.steady_c(power_w, 1.0) {
        return Some(within);
    }
    // Loss goes nearly with a power of the difference to the air: on logarithms nearly a straight
    // line, so that the secant method needs a few steps. The root stays between brackets.
    let over = |y: f64| (loss.loss_w(loss.air_c() + y.exp()) / power_w).ln();
    let (mut low, mut high) = ((curve.top_c() - curve.air_c()).ln(), (TOP_C - loss.air_c()).ln());
    // Written so that a loss of zero, or none that is a number, is no end either.
    let reaches = over(high) >= 0.0;
    if !reaches {
        return None;
    }
    let (mut y, mut slope) = (low, 1.2);
    let mut miss = over(y);
    for _ in 0..100 {
        if miss > 0.0 {
            high = y;
        } else {
            low = y;
        }
        let step = -miss / slope;
        let next =
            if y + step > low && y + step < high { y + step } else { f64::midpoint(low, high) };
        let moved = next - y;
        if moved.abs() < 1e-9 {
            break;
        }
        let now = over(next);
        slope = (now - miss) / moved;
        (y, miss) = (next, now);
    }
    Some(loss.air_c() + y.exp())
}

#[cfg(test)]
mod tests {
    use super::{GAUSS, mean_of_inverse};

    #[test]
    fn eight_points_integrate_powers_exactly() {
        for power in (0..16).step_by(2) {
            let sum: f64 = GAUSS.iter().map(|(x, w)| 2.0 * w * x.powi(power)).sum();
            let exact = 2.0 / f64::from(power + 1);
            assert!((sum - exact).abs() < 1e-13, "x^{power}: {sum} against {exact}");
        }
    }

    #[test]
    fn mean_of_inverse_joins_its_series() {
        for x in [1e-9, 1e-6, 0.000_999, 0.001_001, 0.5, 1e6] {
            let exact = f64::ln_1p(x) / (2.0 * x);
            let found = mean_of_inverse(2.0, 2.0 + 2.0 * x);
            assert!((found / exact - 1.0).abs() < 3e-13, "{x}: {found} against {exact}");
        }
        assert_eq!(mean_of_inverse(4.0, 4.0), 0.25);
    }
}
