//! The heat side against published and independently computed figures, and its physics.
//!
//! Rows "computed with ht 1.2.0 and scipy 1.17.1" come from an independent calculation with those
//! libraries and the same equations; their tolerance is for an implementation of its own.
//!
//! Of that calculation these rows are left out, each because this crate does not compute the thing:
//! - 26, 27: a reference equation of state for air, for information only;
//! - 30: horizontal faces (all faces count alike, the wetted share stands for the top);
//! - 33, 34, 55, 56: mixed plate and cylinder in wind (the turbulent plate is the safe side);
//! - 35: an old rule for walls in wind, for information only;
//! - 80 to 87: two-node stratification (the suction counts as 3 K under the mean instead);
//! - 103, 117: Morgan's cylinder; 104: properties three quarters to the wall (film and bulk bound it);
//! - 113 to 115: conduction in gelled oil (no element is allowed there at all);
//! - 130, 131: 16 A at 230 V, full and at 80 % (13 A is the rule here, and tested);
//! - 137 to 152: night sky and accumulators.

use coldsump::air::Air;
use coldsump::heat::{
    self, Chosen, Circuit, ElementKind, ElementPlace, HeatCapacity, HeatPolicy, LossCurve, OilFilm,
    Rod, TankLoss, Walls, Wanted, WarmUp,
};
use coldsump::oil::{Bulk, ViscosityCurve};
use coldsump::quantity::Density;
use proptest::prelude::*;

const LIBRARY: &str = "computed with ht 1.2.0 and scipy 1.17.1";

struct Oil {
    curve: ViscosityCurve,
    bulk: Bulk,
}

impl Oil {
    fn new(rho15: f64, kv40: f64, kv100: f64) -> Self {
        let curve = ViscosityCurve::through(&[(40.0, kv40), (100.0, kv100)]).unwrap();
        Self { curve, bulk: bulk(rho15) }
    }

    fn vg46() -> Self {
        Self::new(875.0, 46.0, 6.8)
    }

    fn vg32_hv() -> Self {
        Self::new(865.0, 32.0, 6.35)
    }

    fn film(&self) -> OilFilm<'_> {
        OilFilm { curve: &self.curve, bulk: &self.bulk }
    }
}

fn bulk(rho15: f64) -> Bulk {
    Bulk::from_density_15(Density::kg_per_m3(rho15).unwrap())
}

/// Asserts a figure within a share of it.
fn close(row: &str, found: f64, want: f64, share: f64, source: &str) {
    let off = (found - want).abs();
    assert!(off <= share * want.abs(), "{row}: {found}, not {want} within {share} [{source}]");
}

/// Asserts a figure within a difference.
fn near(row: &str, found: f64, want: f64, difference: f64, source: &str) {
    let off = (found - want).abs();
    assert!(off <= difference, "{row}: {found}, not {want} within {difference} [{source}]");
}

#[test]
fn bulk_properties_of_a_mineral_oil() {
    let b = bulk(875.0);
    near("1 sg60", b.specific_gravity(), 0.875_862, 1e-6, LIBRARY);
    for (row, t, want) in [
        ("2", -40.0, 1655.26),
        ("3", -20.0, 1727.73),
        ("4", 0.0, 1800.21),
        ("5", 20.0, 1872.68),
        ("6", 40.0, 1945.15),
        ("7", 100.0, 2162.57),
    ] {
        close(row, b.specific_heat(t), want, 1e-4, LIBRARY);
    }
    for (row, t, want) in [
        ("8", -40.0, 0.136_768),
        ("9", 0.0, 0.133_876),
        ("10", 40.0, 0.130_985),
        ("11", 100.0, 0.126_647),
    ] {
        close(row, b.conductivity(t), want, 1e-4, LIBRARY);
    }
    // One kilogram without steel; heat capacity is linear, so its middle counts.
    let kilogram = HeatCapacity::new(1000.0 / 875.0, &b, 0.0, 440.0);
    close("17 dh", kilogram.at(-5.0) * 50.0, 89_104.4, 1e-4, LIBRARY);
    for (row, t, want) in [
        ("12", -40.0, 909.086),
        ("13", 0.0, 884.386),
        ("14", 40.0, 859.224),
        ("15", 100.0, 820.786),
    ] {
        close(row, b.density(t), want, 1e-5, LIBRARY);
    }
    close("16 beta", b.expansion(0.0), 0.000_705_131, 1e-4, LIBRARY);
}

#[test]
fn viscosity_and_prandtl_of_vg46() {
    let oil = Oil::vg46();
    for (row, t, want) in [
        ("18", -30.0, 17_382.2),
        ("19", -20.0, 4517.84),
        ("20", 0.0, 577.321),
        ("21", 20.0, 133.838),
    ] {
        close(row, oil.curve.at(t), want, 1e-3, LIBRARY);
    }
    let b = &oil.bulk;
    let pr = oil.curve.at(0.0) * 1e-6 * b.density(0.0) * b.specific_heat(0.0) / b.conductivity(0.0);
    close("22 Pr", pr, 6865.59, 2e-3, LIBRARY);
}

#[test]
fn engine_oil_of_the_textbook_table() {
    let source =
        "F. P. Incropera et al., Fundamentals of Heat and Mass Transfer, table A.5, quoted";
    let b = bulk(891.1);
    // K, kg/m³, J/(kg·K), W/(m·K)
    for (kelvin, rho, cp, k) in [
        (273.0, 899.1, 1796.0, 0.147),
        (280.0, 895.3, 1827.0, 0.144),
        (290.0, 890.0, 1868.0, 0.145),
        (300.0, 884.1, 1909.0, 0.145),
        (310.0, 877.9, 1951.0, 0.145),
        (320.0, 871.8, 1993.0, 0.143),
        (330.0, 865.8, 2035.0, 0.141),
        (340.0, 859.9, 2076.0, 0.139),
        (350.0, 853.9, 2118.0, 0.138),
        (360.0, 847.8, 2161.0, 0.138),
        (370.0, 841.8, 2206.0, 0.137),
        (380.0, 836.0, 2250.0, 0.136),
        (390.0, 830.6, 2294.0, 0.135),
        (400.0, 825.1, 2337.0, 0.134),
        (410.0, 818.9, 2381.0, 0.133),
        (420.0, 812.1, 2427.0, 0.133),
        (430.0, 806.5, 2471.0, 0.132),
    ] {
        let t = kelvin - 273.15;
        close(&format!("{kelvin} K density"), b.density(t), rho, 0.009, source);
        close(&format!("{kelvin} K specific heat"), b.specific_heat(t), cp, 0.055, source);
        close(&format!("{kelvin} K conductivity"), b.conductivity(t), k, 0.12, source);
    }
}

#[test]
fn air_at_minus_ten() {
    let air = Air::at(-10.0);
    close("23 rho", air.density, 1.341_37, 5e-4, LIBRARY);
    close("24 nu", air.kinematic_viscosity, 1.242_13e-5, 1e-3, LIBRARY);
    close("25 k", air.conductivity, 0.023_336_3, 1e-3, LIBRARY);
    close("28 mu", air.density * air.kinematic_viscosity, 1.666_15e-5, 1e-3, LIBRARY);
    close("beta", air.expansion, 1.0 / 263.15, 1e-12, "ideal gas");
}

#[test]
fn single_films() {
    close("29 plate in still air", heat::still_air(0.0, -20.0, 0.42), 4.513_18, 5e-3, LIBRARY);
    close("31 radiation", heat::radiation(0.9, 0.0, -20.0), 3.725_21, 1e-4, LIBRARY);
    close("32 wind", heat::wind(0.0, -20.0, 6.0, 0.8), 28.5034, 5e-3, LIBRARY);
    let oil = Oil::vg46();
    close("36 oil at a wall", oil.film().wall(20.0, 0.0, 0.42), 42.8712, 5e-3, LIBRARY);
    // Engine oil of the table at 320 K: ν 161e-6, k 0.143, Pr 1965, β 0.70e-3; 40 K, 10 mm.
    let (nu, k, pr, beta, d) = (161e-6, 0.143, 1965.0, 0.70e-3, 0.010_f64);
    let ra = 9.806_65 * beta * 40.0 * d.powi(3) / (nu * nu) * pr;
    close("116 rod", heat::nusselt_rod(ra, pr) * k / d, 98.4384, 1e-3, LIBRARY);
    // Rows 29, 31 and 32 together.
    let blend = (28.5034_f64.powi(3) + 4.513_18_f64.powi(3)).cbrt() + 3.725_21;
    close("blend", heat::outside(0.0, -20.0, 6.0, 0.42, 0.8, 0.9), blend, 5e-3, LIBRARY);
}

const AREA: f64 = 2.36;

/// The tank of the reference calculation, bare or with insulation in mm of 0.040 W/(m·K).
fn walls(wind: f64, insulation_mm: f64) -> Walls {
    let insulation = insulation_mm / 1000.0 / 0.040;
    Walls { height: 0.42, length: 0.8, wind, insulation, emissivity: 0.9 }
}

/// Heat loss of that tank with all of its surface wetted.
fn films(oil: &Oil, wind: f64, insulation_mm: f64, air_c: f64) -> TankLoss<'_> {
    TankLoss::from_films(walls(wind, insulation_mm), oil.film(), 1.0, AREA, air_c)
}

#[test]
fn u_through_the_films() {
    let oil = Oil::vg46();
    // Row, oil °C, air °C, wind m/s, insulation mm, U.
    for (row, t, air, wind, mm, want) in [
        ("37", 20.0, -30.0, 0.0, 0.0, 7.505_03),
        ("38", 20.0, -30.0, 0.0, 25.0, 1.234_46),
        ("39", 20.0, -30.0, 0.0, 50.0, 0.687_919),
        ("40", 20.0, -30.0, 6.0, 0.0, 18.4964),
        ("41", 20.0, -30.0, 6.0, 25.0, 1.445_43),
        ("42", 20.0, -30.0, 6.0, 50.0, 0.756_205),
        ("43", 0.0, -40.0, 0.0, 0.0, 6.194_23),
        ("44", 0.0, -40.0, 0.0, 25.0, 1.189_07),
        ("45", 0.0, -40.0, 0.0, 50.0, 0.672_209),
        ("46", 0.0, -40.0, 6.0, 0.0, 14.1968),
        ("47", 0.0, -40.0, 6.0, 25.0, 1.408_65),
        ("48", 0.0, -40.0, 6.0, 50.0, 0.744_783),
        ("49", 40.0, -20.0, 0.0, 0.0, 8.6278),
        ("50", 40.0, -20.0, 0.0, 25.0, 1.265_46),
        ("51", 40.0, -20.0, 0.0, 50.0, 0.698_516),
        ("52", 40.0, -20.0, 6.0, 0.0, 21.3492),
        ("53", 40.0, -20.0, 6.0, 25.0, 1.465),
        ("54", 40.0, -20.0, 6.0, 50.0, 0.762_275),
        ("57", -20.0, -30.0, 0.0, 0.0, 3.922_98),
        ("58", -20.0, -30.0, 6.0, 0.0, 8.594_14),
    ] {
        let loss = films(&oil, wind, mm, air);
        close(row, loss.u_value(t), want, 1e-2, LIBRARY);
        close(row, loss.loss_w(t), loss.u_value(t) * AREA * (t - air), 1e-12, "U A ΔT");
    }
}

#[test]
fn three_ways_to_the_loss() {
    let oil = Oil::vg46();
    let air = -30.0;
    let film = TankLoss::from_films(walls(0.0, 0.0), oil.film(), 0.9, AREA, air);
    close("share", film.loss_w(20.0), 0.9 * film.u_value(20.0) * AREA * 50.0, 1e-12, "0.9 U A ΔT");
    let given = TankLoss::from_u_value(7.0, AREA, air);
    close("given U", given.loss_w(20.0), 7.0 * AREA * 50.0, 1e-12, "U A ΔT");
    close("given U", given.u_value(20.0), 7.0, 1e-12, "as given");
    // Two readings of a tank of 300 kJ/K that fell from 45 K to 20 K over the air in 8 h.
    let ua = heat::cooldown_ua(300_000.0, 20.0, -5.0, -25.0, 8.0 * 3600.0);
    close("UA", ua, 8.447, 1e-4, "300000/28800 ln 2.25, by hand");
    let read = TankLoss::from_cooldown(ua, AREA, air);
    close("read", read.loss_w(20.0), ua * 50.0, 1e-12, "UA ΔT");
    close("read", read.u_value(20.0), ua / AREA, 1e-12, "UA over the surface");
    for loss in [film, given, read] {
        assert_eq!(loss.loss_w(air), 0.0);
        assert_eq!(loss.loss_w(air - 10.0), 0.0);
        let more = loss.extra_insulation(0.025, 0.040);
        let want = 1.0 / (1.0 / loss.u_value(20.0) + 0.025 / 0.040);
        close("blanket", more.u_value(20.0), want, 1e-12, "1/U' = 1/U + d/k");
        let share = loss.loss_w(20.0) / loss.u_value(20.0);
        close("blanket", more.loss_w(20.0), share * want, 1e-12, "loss follows U");
    }
    // Put on afterwards or there from the start: nearly the same, never less.
    let built_in = films(&oil, 0.0, 25.0, air).u_value(20.0);
    let put_on = films(&oil, 0.0, 0.0, air).extra_insulation(0.025, 0.040).u_value(20.0);
    assert!(put_on >= built_in && put_on < 1.1 * built_in, "{put_on} {built_in}");
}

/// The tank of the reference calculation: 200 L of VG 46 and 40 kg of steel.
fn tank() -> HeatCapacity {
    HeatCapacity::new(200.0, &bulk(875.0), 40.0, 440.0)
}

/// A body of steel with that heat capacity at every temperature: the closed forms hold for it.
fn steel() -> HeatCapacity {
    HeatCapacity::new(0.0, &bulk(875.0), 329_465.0 / 440.0, 440.0)
}

/// A tank of fixed loss in W/K, in air of -30 °C.
fn fixed(ua: f64) -> LossCurve {
    LossCurve::new(&TankLoss::from_cooldown(ua, AREA, -30.0), 90.0)
}

#[test]
fn warm_up_with_fixed_loss() {
    close("59 C", tank().at(-5.0), 329_465.0, 1e-4, LIBRARY);
    // Row, body, its UA, power, hours, tolerance.
    for (row, body, ua, power, hours, share) in [
        ("60", steel(), 16.0, 1500.0, Some(4.359_35), 1e-4),
        ("61", tank(), 16.0, 1500.0, Some(4.385_75), 5e-4),
        ("62", steel(), 16.0, 500.0, None, 0.0),
        ("63", tank(), 16.0, 500.0, None, 0.0),
        ("64", steel(), 0.0, 1500.0, Some(3.050_61), 1e-4),
        ("65", tank(), 0.0, 1500.0, Some(3.050_61), 5e-4),
        ("66", steel(), 3.0, 750.0, Some(6.807_23), 1e-4),
        ("67", tank(), 3.0, 750.0, Some(6.8194), 5e-4),
    ] {
        let time = WarmUp::new(&fixed(ua), &body, -30.0, 20.0, 1.0).time_s(power);
        match hours {
            Some(hours) => close(row, time.unwrap() / 3600.0, hours, share, LIBRARY),
            None => assert_eq!(time, None, "{row}: never [{LIBRARY}]"),
        }
    }
    close("71 hold", fixed(16.0).loss_w(20.0), 800.0, 1e-12, LIBRARY);
    close("62 ends at", fixed(16.0).steady_c(500.0, 1.0).unwrap(), 1.25, 1e-5, LIBRARY);
}

#[test]
fn warm_up_through_films() {
    let oil = Oil::vg46();
    for (row, wind, mm, power, hours) in [
        ("68", 6.0, 0.0, 1500.0, None),
        ("69", 0.0, 0.0, 1500.0, Some(4.320_27)),
        ("70", 6.0, 50.0, 750.0, Some(6.494_81)),
    ] {
        let curve = LossCurve::new(&films(&oil, wind, mm, -30.0), 90.0);
        let time = WarmUp::new(&curve, &tank(), -30.0, 20.0, 1.0).time_s(power);
        match hours {
            Some(hours) => close(row, time.unwrap() / 3600.0, hours, 1e-2, LIBRARY),
            None => assert_eq!(time, None, "{row}: never [{LIBRARY}]"),
        }
    }
}

#[test]
fn cooling() {
    close("72 tau", tank().at(-5.0) / 16.0 / 3600.0, 5.719_89, 1e-4, LIBRARY);
    let seconds = heat::cooling_time_s(&fixed(16.0), &steel(), 50.0, -20.0, 1.0).unwrap();
    close("73 cooling", seconds / 3600.0, 11.8942, 1e-4, LIBRARY);
    for (row, u, want) in
        [("74", 16.0, -29.434), ("75", 6.8, -20.2449), ("76", 1.4, 21.8731), ("77", 0.74, 33.6269)]
    {
        let cold = heat::parked_c(&fixed(u * AREA), &steel(), 50.0, 12.0, 1.0, |_| -30.0);
        near(row, cold, want, 0.01, LIBRARY);
    }
    let (share, lag) = heat::daily_wave(5.719_89);
    close("78 wave", share, 0.555_35, 1e-4, LIBRARY);
    close("79 lag", lag, 3.751_01, 1e-4, LIBRARY);
}

#[test]
fn cooling_time_and_cooled_temperature_agree() {
    let oil = Oil::vg46();
    for (wind, mm) in [(0.0, 0.0), (6.0, 0.0), (2.0, 50.0)] {
        let curve = LossCurve::new(&films(&oil, wind, mm, -30.0), 90.0);
        for factor in [1.0, 1.4] {
            let cold = heat::cooled_c(&curve, &tank(), 50.0, 10.0, factor, |_| -30.0);
            let time = heat::cooling_time_s(&curve, &tank(), 50.0, cold, factor).unwrap();
            close("hours", time / 3600.0, 10.0, 2e-4, "one is the inverse of the other");
        }
    }
    assert_eq!(heat::cooling_time_s(&fixed(16.0), &tank(), 0.0, -30.0, 1.0), None, "to the air");
    assert_eq!(heat::cooling_time_s(&fixed(16.0), &tank(), 0.0, 5.0, 1.0), None, "warmer");
    assert_eq!(heat::cooling_time_s(&fixed(0.0), &tank(), 5.0, 0.0, 1.0), None, "no loss");
    assert_eq!(heat::cooling_time_s(&fixed(16.0), &tank(), 5.0, 5.0, 1.0), Some(0.0));
}

#[test]
fn a_night_of_hourly_air() {
    let curve = fixed(16.0);
    let night: Vec<f64> = (0..25).map(|hour| -10.0 - f64::from(hour)).collect();
    let air = heat::hourly(&night).unwrap();
    for (hour, want) in [(-1.0, -10.0), (0.0, -10.0), (2.5, -12.5), (24.0, -34.0), (99.0, -34.0)] {
        near(&format!("hour {hour}"), air(hour), want, 1e-12, "straight between hours");
    }
    assert!(heat::hourly(&[]).is_none());
    // Air that falls at r: T = Ta(t) - r τ + (T0 - Ta0 + r τ) e^(-t/τ), r = -1 K/h.
    let tau = 329_465.0_f64 / 16.0 / 3600.0;
    let cold = heat::parked_c(&curve, &steel(), 40.0, 12.0, 1.0, &air);
    let want = -22.0 + tau + (50.0 - tau) * (-12.0 / tau).exp();
    near("falling air", cold, want, 0.01, "C dT/dt = -UA (T - Ta) in closed form");
    let steady = [-30.0; 25];
    let hourly = heat::hourly(&steady).unwrap();
    let a = heat::parked_c(&curve, &tank(), 40.0, 12.0, 1.4, hourly);
    let b = heat::parked_c(&curve, &tank(), 40.0, 12.0, 1.4, |_| -30.0);
    near("constant", a, b, 1e-9, "the same air");
    // Over a day nothing is credited; a tank colder than the air gains nothing.
    assert_eq!(heat::parked_c(&curve, &tank(), 40.0, 24.5, 1.0, &air), -34.0);
    assert_eq!(heat::parked_c(&curve, &tank(), -40.0, 12.0, 1.0, &air), -40.0);
    // A thimble of a tank with the loss of a house does not shake itself to pieces.
    let thimble = HeatCapacity::new(0.1, &bulk(875.0), 0.0, 440.0);
    let fast = heat::parked_c(&fixed(5000.0), &thimble, 50.0, 12.0, 1.4, |_| -30.0);
    near("thimble", fast, -30.0, 1e-6, "cools at once");
}

/// Adaptive Simpson integration.
fn integral(f: &dyn Fn(f64) -> f64, a: f64, b: f64, tolerance: f64) -> f64 {
    let simpson = |a: f64, b: f64, fa: f64, fm: f64, fb: f64| (b - a) / 6.0 * (fa + 4.0 * fm + fb);
    let (fa, fm, fb) = (f(a), f(f64::midpoint(a, b)), f(b));
    let mut open = vec![(a, b, fa, fm, fb, simpson(a, b, fa, fm, fb), tolerance, 0)];
    let mut sum = 0.0;
    while let Some((a, b, fa, fm, fb, whole, tolerance, depth)) = open.pop() {
        let m = f64::midpoint(a, b);
        let (fl, fr) = (f(f64::midpoint(a, m)), f(f64::midpoint(m, b)));
        let (left, right) = (simpson(a, m, fa, fl, fm), simpson(m, b, fm, fr, fb));
        let off = left + right - whole;
        if off.abs() < 15.0 * tolerance || depth > 40 {
            sum += left + right + off / 15.0;
        } else {
            open.push((a, m, fa, fl, fm, left, tolerance / 2.0, depth + 1));
            open.push((m, b, fm, fr, fb, right, tolerance / 2.0, depth + 1));
        }
    }
    sum
}

struct Hard {
    oil: Oil,
    wind: f64,
    insulation_mm: f64,
    air: f64,
    from: f64,
    target: f64,
    hours: f64,
}

impl Hard {
    fn loss(&self) -> TankLoss<'_> {
        let walls = walls(self.wind, self.insulation_mm);
        TankLoss::from_films(walls, self.oil.film(), 0.9, AREA, self.air)
    }
}

fn hard_cases() -> Vec<Hard> {
    let points = [(-30.0, 40_000.0), (0.0, 600.0), (40.0, 46.0), (100.0, 6.8)];
    let kinked = Oil { curve: ViscosityCurve::through(&points).unwrap(), bulk: bulk(875.0) };
    let hard = |oil, wind, insulation_mm, air, from, target, hours| Hard {
        oil,
        wind,
        insulation_mm,
        air,
        from,
        target,
        hours,
    };
    vec![
        hard(Oil::vg46(), 0.0, 0.0, -30.0, -30.0, 20.0, 4.0),
        hard(Oil::vg46(), 6.0, 0.0, -40.0, -40.0, 10.0, 4.0),
        hard(Oil::vg46(), 6.0, 50.0, -40.0, -40.0, 60.0, 12.0),
        hard(Oil::vg46(), 0.0, 0.0, -40.0, -40.0, 20.0, 200.0),
        hard(Oil::vg46(), 0.4, 0.0, -30.0, -25.0, -18.0, 0.5),
        hard(Oil::vg32_hv(), 20.0, 0.0, -60.0, -60.0, 60.0, 8.0),
        hard(Oil::new(820.0, 5.0, 1.6), 10.0, 0.0, -55.0, -35.0, 5.0, 48.0),
        hard(Oil::new(880.0, 100.0, 11.0), 0.4, 25.0, -20.0, -20.0, 35.0, 1.0),
        hard(kinked, 3.0, 0.0, -35.0, -35.0, 25.0, 6.0),
    ]
}

#[test]
fn needed_power_agrees_with_quadrature_of_the_exact_films() {
    for (at, case) in hard_cases().iter().enumerate() {
        let (loss, time) = (case.loss(), case.hours * 3600.0);
        let curve = LossCurve::new(&loss, 90.0);
        let rise = case.target - case.from;
        for factor in [1.0, 1.4] {
            let way = WarmUp::new(&curve, &tank(), case.from, case.target, factor);
            let power = way.needed_power_w(time);
            let exact = |power: f64| {
                // Dense next to the target, where the loss may be close to the power.
                let f = |y: f64| {
                    let t = case.target - rise * y * y;
                    tank().at(t) / (power - factor * loss.loss_w(t)) * 2.0 * rise * y
                };
                integral(&f, 0.0, 1.0, time * 1e-7)
            };
            let least = factor * loss.loss_w(case.target) * (1.0 + 1e-9);
            let (mut low, mut high) = (least.max(0.99 * power), 1.01 * power);
            while high - low > 1e-6 * power {
                let middle = f64::midpoint(low, high);
                if exact(middle) > time { low = middle } else { high = middle }
            }
            let name = format!("case {at}, factor {factor}");
            close(&name, power, f64::midpoint(low, high), 2e-4, "adaptive Simpson, exact films");
        }
    }
}

#[test]
fn the_curve_is_the_films() {
    for (at, case) in hard_cases().iter().enumerate() {
        let loss = case.loss();
        let curve = LossCurve::new(&loss, 90.0);
        let largest = loss.loss_w(90.0);
        let mut last = 0.0;
        for i in 1..=2000 {
            let t = case.air + (90.0 - case.air) * f64::from(i) / 2000.0;
            let (found, exact) = (curve.loss_w(t), loss.loss_w(t));
            let off = (found - exact).abs();
            // Next to the air there is little to lose: there a share of the greatest loss counts.
            let ok = off < 2e-4 * exact + 1e-6 * largest;
            assert!(ok, "case {at}, {t} °C: {found} W for {exact}");
            assert!(found > last, "case {at}: falls at {t} °C");
            last = found;
        }
    }
}

#[test]
fn a_power_barely_over_the_loss_stays_accurate() {
    // Fixed UA and heat capacity: t = C/UA ln((P - UA ΔT0)/(P - UA ΔT1)).
    for over in [1e-2, 1e-4, 1e-6, 1e-9] {
        let power = 800.0 * (1.0 + over);
        let time = WarmUp::new(&fixed(16.0), &steel(), -30.0, 20.0, 1.0).time_s(power).unwrap();
        let want = 329_465.0 / 16.0 * (power / (power - 800.0)).ln();
        close(&format!("over by {over}"), time, want, 1e-6, "closed form");
    }
    // Through films: fine quadrature of the same loss, in z with T = target + shift - e^(-z), in
    // which the integrand is bounded and flat.
    let oil = Oil::vg46();
    let curve = LossCurve::new(&films(&oil, 6.0, 0.0, -30.0), 90.0);
    let way = WarmUp::new(&curve, &tank(), -30.0, 20.0, 1.0);
    for over in [1e-1, 1e-2, 1e-4, 1e-6] {
        let power = curve.loss_w(20.0) * (1.0 + over);
        let shift = 50.0 * over;
        let f = |z: f64| {
            let gap = (-z).exp();
            let t = 20.0 + shift - gap;
            tank().at(t) * gap / (power - curve.loss_w(t))
        };
        let want = integral(&f, -(50.0 + shift).ln(), -shift.ln(), 1.0);
        let found = way.time_s(power).unwrap();
        close(&format!("films over by {over}"), found, want, 1e-4, "adaptive Simpson");
    }
    assert_eq!(way.time_s(curve.loss_w(20.0)), None);
    assert_eq!(way.time_s(0.0), None);
    assert_eq!(way.time_s(f64::NAN), None);
}

#[test]
fn nothing_to_warm_takes_no_time() {
    for to in [-30.0, -40.0] {
        let way = WarmUp::new(&fixed(16.0), &tank(), -30.0, to, 1.0);
        assert_eq!(way.time_s(0.0), Some(0.0));
        assert_eq!(way.needed_power_w(3600.0), 0.0);
    }
}

#[test]
fn steady_temperature_holds_its_power() {
    let oil = Oil::vg46();
    let loss = films(&oil, 2.0, 0.0, -30.0);
    let curve = LossCurve::new(&loss, 90.0);
    for power in [1.0, 100.0, 800.0, 2000.0, 6000.0] {
        let steady = heat::steady_c(&curve, &loss, power).unwrap();
        close("steady", loss.loss_w(steady), power, 2e-4, "definition");
        let high = curve.steady_c(power, 1.4);
        match high {
            Some(high) => close("high", 1.4 * loss.loss_w(high), power, 2e-4, "definition"),
            None => assert!(1.4 * loss.loss_w(90.0) < power, "over the top of the curve"),
        }
    }
    let beyond = heat::steady_c(&curve, &loss, 6000.0).unwrap();
    assert!(beyond > 90.0, "{beyond}");
    close("beyond", loss.loss_w(beyond), 6000.0, 1e-6, "definition");
    assert_eq!(heat::steady_c(&curve, &loss, 1e6), None);
    assert_eq!(heat::steady_c(&curve, &loss, 0.0), Some(-30.0));
    let without = TankLoss::from_u_value(0.0, AREA, -30.0);
    assert_eq!(heat::steady_c(&LossCurve::new(&without, 90.0), &without, 100.0), None);
}

#[test]
fn target_and_mixing() {
    let policy = HeatPolicy::default();
    let by_hand = "this project's judgement, by hand";
    let target =
        |floor, soak, place| heat::mean_target_c(floor, soak, 300.0, 150.0, place, &policy);
    near("below", target(-10.0, -30.0, ElementPlace::BelowSuction), -2.0, 1e-12, by_hand);
    near("circulated", target(-10.0, -30.0, ElementPlace::Circulated), -5.0, 1e-12, by_hand);
    near("warm rest", target(-10.0, 0.0, ElementPlace::BelowSuction), -4.0, 1e-12, by_hand);
    near("mixed", heat::mixed_c(300.0, 10.0, 100.0, -30.0), 0.0, 1e-12, "heat balance");
}

fn rod(oil: &Oil, mm: f64) -> Rod<'_> {
    Rod { oil: oil.film(), diameter: mm / 1000.0 }
}

#[test]
fn skin_with_film_properties() {
    let oil = Oil::vg46();
    for (row, q, t, want) in [
        ("88", 0.8, -30.0, 51.1868),
        ("89", 0.8, -10.0, 57.7944),
        ("90", 0.8, 20.0, 73.352),
        ("91", 1.55, -30.0, 81.5665),
        ("92", 1.55, -10.0, 86.9225),
        ("93", 1.55, 20.0, 100.135),
        ("94", 2.33, -30.0, 104.813),
        ("95", 2.33, -10.0, 109.72),
        ("96", 2.33, 20.0, 121.861),
        ("97", 2.8, -30.0, 116.685),
        ("98", 2.8, -10.0, 121.474),
        ("99", 2.8, 20.0, 133.24),
        ("100", 3.57, -30.0, 133.935),
        ("101", 3.57, -10.0, 138.646),
        ("102", 3.57, 20.0, 150.026),
    ] {
        near(row, rod(&oil, 10.0).skin_film(q, t).unwrap(), want, 0.5, LIBRARY);
    }
    near("105", rod(&oil, 16.0).skin_film(1.55, -30.0).unwrap(), 85.6781, 0.5, LIBRARY);
    let hv = Oil::vg32_hv();
    near("106", rod(&hv, 10.0).skin_film(1.55, -30.0).unwrap(), 73.6697, 0.5, LIBRARY);
    close("118", rod(&oil, 10.0).density_film(120.0, -20.0), 2.852_18, 5e-3, LIBRARY);
    close("119", rod(&oil, 10.0).density_film(150.0, 20.0), 3.568_73, 5e-3, LIBRARY);
}

#[test]
fn skin_with_bulk_properties() {
    let oil = Oil::vg46();
    for (row, q, t, want) in [
        ("107", 1.55, -30.0, 288.909),
        ("108", 0.70, -30.0, 136.537),
        ("109", 1.55, -10.0, 187.505),
        ("110", 0.70, -10.0, 94.4137),
        ("111", 1.55, 20.0, 140.032),
        ("112", 0.70, 20.0, 84.0784),
    ] {
        near(row, rod(&oil, 10.0).skin_bulk(q, t).unwrap(), want, 0.5, LIBRARY);
    }
}

#[test]
#[allow(clippy::approx_constant, reason = "3.14 W/cm² is a printed figure")]
fn watt_density_for_a_skin() {
    let (vg32, vg46) = (Oil::new(870.0, 32.0, 5.4), Oil::vg46());
    let (vg68, hv) = (Oil::new(880.0, 68.0, 8.7), Oil::vg32_hv());
    let at = [-40.0, -30.0, -20.0, -10.0, 0.0, 20.0, 40.0];
    let film = [
        (&vg32, 100.0, [2.47, 2.40, 2.30, 2.18, 2.04, 1.69, 1.27]),
        (&vg32, 120.0, [3.33, 3.25, 3.14, 3.01, 2.84, 2.45, 1.99]),
        (&vg32, 150.0, [4.90, 4.79, 4.66, 4.49, 4.30, 3.85, 3.31]),
        (&vg46, 100.0, [2.21, 2.15, 2.08, 1.98, 1.85, 1.55, 1.17]),
        (&vg46, 120.0, [3.00, 2.94, 2.85, 2.74, 2.60, 2.26, 1.84]),
        (&vg46, 150.0, [4.46, 4.38, 4.27, 4.13, 3.97, 3.57, 3.08]),
        (&vg68, 100.0, [1.95, 1.92, 1.86, 1.78, 1.67, 1.41, 1.07]),
        (&vg68, 120.0, [2.68, 2.64, 2.57, 2.48, 2.36, 2.07, 1.69]),
        (&vg68, 150.0, [4.03, 3.98, 3.89, 3.78, 3.64, 3.29, 2.86]),
        (&hv, 100.0, [2.52, 2.43, 2.32, 2.18, 2.02, 1.66, 1.24]),
        (&hv, 120.0, [3.35, 3.25, 3.12, 2.97, 2.80, 2.39, 1.93]),
        (&hv, 150.0, [4.84, 4.71, 4.56, 4.38, 4.18, 3.72, 3.19]),
    ];
    let bulk = [
        (&vg32, 120.0, [0.57, 0.73, 0.91, 1.07, 1.22, 1.39, 1.37]),
        (&vg32, 150.0, [0.70, 0.92, 1.16, 1.39, 1.61, 1.94, 2.06]),
        (&vg46, 120.0, [0.47, 0.62, 0.77, 0.92, 1.05, 1.23, 1.24]),
        (&vg46, 150.0, [0.58, 0.77, 0.98, 1.19, 1.39, 1.72, 1.86]),
    ];
    // The printed rounding, and half a per cent for an implementation of its own.
    let check = |found: f64, want: f64, what: String| {
        near(&what, found, want, 0.005 + 0.005 * want, LIBRARY);
    };
    for (oil, skin, row) in film {
        for (t, want) in at.into_iter().zip(row) {
            let what = format!("film, {skin} °C in oil of {t} °C");
            check(rod(oil, 10.0).density_film(skin, t), want, what);
        }
    }
    for (oil, skin, row) in bulk {
        for (t, want) in at.into_iter().zip(row) {
            let what = format!("bulk, {skin} °C in oil of {t} °C");
            check(rod(oil, 10.0).density_bulk(skin, t), want, what);
        }
    }
}

#[test]
fn caps_and_limits_of_the_watt_density() {
    let policy = HeatPolicy::default();
    for (nu, want) in [
        (None, 0.7),
        (Some(5000.1), 0.7),
        (Some(5000.0), 1.2),
        (Some(500.0), 1.2),
        (Some(499.9), 1.55),
        (Some(20.0), 1.55),
    ] {
        let found = heat::density_cap(nu, ElementPlace::BelowSuction, &policy);
        assert_eq!(found, want, "{nu:?} [common practice; the steps are judgement]");
    }
    let circulated = heat::density_cap(None, ElementPlace::Circulated, &policy);
    assert_eq!(circulated, 2.3, "[Machinery Lubrication, Nov-Dec 2016, p. 47: 15 W/in²]");
    assert!(heat::immersion_allowed(-23.0, Some(-24.0)));
    assert!(!heat::immersion_allowed(-24.0, Some(-24.0)));
    assert!(heat::immersion_allowed(-60.0, None));

    let oil = Oil::vg46();
    let rod = rod(&oil, 10.0);
    let most = |flash| rod.greatest_density(1.55, 10.0, -20.0, flash, &policy);
    assert_eq!(most(None), 1.55, "a film of 120 °C would allow more");
    // Flash 150 °C: the bulk bound at 120 °C in oil of -20 °C.
    let tight = most(Some(150.0));
    near("bulk bound", tight, 0.77, 0.009, LIBRARY);
    near("its skin", rod.skin_bulk(tight, -20.0).unwrap(), 120.0, 1e-3, "the inverse");
    assert_eq!(most(Some(35.0)), 0.0, "flash less 30 K is under the oil");
    assert_eq!(rod.greatest_density(9.9, 125.0, -20.0, None, &policy), 0.0, "oil over 120 °C");
}

#[test]
fn pads() {
    let policy = HeatPolicy::default();
    let source = "0.5 W/cm² common practice, 75 % judgement";
    close("surface", heat::pad_most_w(0.6, &policy), 3000.0, 1e-12, source);
    close("oil", heat::into_oil_w(ElementKind::Pad, 1000.0, &policy), 750.0, 1e-12, source);
    close("back", heat::electrical_w(ElementKind::Pad, 750.0, &policy), 1000.0, 1e-12, source);
    close("rod", heat::into_oil_w(ElementKind::Immersion, 9.0, &policy), 9.0, 1e-12, "all of it");
}

#[test]
fn circulation() {
    let flow = 60.0 / 60_000.0;
    close("120 power", heat::circulation_heat_w(1.0, flow, 50e5), 5000.0, 1e-12, LIBRARY);
    close("share", heat::circulation_heat_w(0.05, flow, 50e5), 250.0, 1e-12, "share Q p");
    let b = bulk(875.0);
    let rise = 100e5 / (b.density(0.0) * b.specific_heat(0.0));
    close("121 rise a pass", rise, 6.2811, 5e-4, LIBRARY);
    close("122 throttling", rise * (1.0 - b.expansion(0.0) * 273.15), 5.071_32, 5e-4, LIBRARY);
    let circuit = HeatCapacity::new(300.0, &b, 250.0, 440.0);
    let time = |heat, to| heat::circulation_time_s(&circuit, heat, 40.0, -10.0, -10.0, to);
    close("123 minutes", time(5000.0, 30.0).unwrap() / 60.0, 95.3368, 5e-4, LIBRARY);
    assert_eq!(time(1600.0, 30.0), None, "steady at the target");
    assert_eq!(time(0.0, -20.0), Some(0.0), "there already");
    close("steady", heat::circulation_steady_c(1600.0, 40.0, -10.0), 30.0, 1e-12, "Ta + P/UA");
    close("no heat", heat::circulation_steady_c(0.0, 0.0, -10.0), -10.0, 1e-12, "the air");
    // The loop and the tank are one kind of body.
    let curve = LossCurve::new(&TankLoss::from_cooldown(40.0, 1.0, -10.0), 90.0);
    let same = WarmUp::new(&curve, &circuit, -10.0, 30.0, 1.0).time_s(5000.0).unwrap();
    close("two ways", time(5000.0, 30.0).unwrap(), same, 1e-5, "the same integral");
}

fn circuit(volts: f64, amperes: f64, three_phase: bool) -> Circuit {
    Circuit { volts, amperes, three_phase, other_w: 0.0 }
}

#[test]
fn what_a_circuit_carries() {
    let policy = HeatPolicy::default();
    let plug = "13 A from a 16 A plug outlet: common practice, no source";
    let rating = "the rating: this project's judgement";
    for (row, volts, amperes, three, want, source) in [
        ("124", 120.0, 15.0, false, 1440.0, LIBRARY),
        ("125", 120.0, 20.0, false, 1920.0, LIBRARY),
        ("126", 208.0, 20.0, false, 3328.0, LIBRARY),
        ("127", 240.0, 15.0, false, 2880.0, LIBRARY),
        ("128", 240.0, 20.0, false, 3840.0, LIBRARY),
        ("129", 240.0, 30.0, false, 5760.0, LIBRARY),
        ("230 V plug", 230.0, 16.0, false, 2990.0, plug),
        ("220 V plug", 220.0, 16.0, false, 2860.0, plug),
        ("10 A", 230.0, 10.0, false, 2300.0, rating),
        ("32 A", 230.0, 32.0, false, 7360.0, rating),
        ("400 V three-phase", 400.0, 16.0, true, 3_f64.sqrt() * 6400.0, rating),
        ("480 V three-phase", 480.0, 20.0, true, 3_f64.sqrt() * 7680.0, "NFPA 70 210.20(A)"),
        ("24 V", 24.0, 20.0, false, 480.0, rating),
    ] {
        close(row, circuit(volts, amperes, three).continuous_w(&policy), want, 1e-12, source);
    }
    for (volts, share) in [
        (99.0, 1.0),
        (100.0, 0.8),
        (127.0, 0.8),
        (200.0, 0.8),
        (208.0, 0.8),
        (220.0, 1.0),
        (240.0, 0.8),
        (277.0, 0.8),
        (347.0, 0.8),
        (400.0, 1.0),
        (480.0, 0.8),
        (575.0, 0.8),
        (600.0, 0.8),
    ] {
        let found = circuit(volts, 10.0, false).continuous_w(&policy) / (volts * 10.0);
        close(
            &format!("{volts} V"),
            found,
            share,
            1e-12,
            "NFPA 70 210.20(A), quoted; 230 V: rating",
        );
    }
    let loaded = |other_w| Circuit { other_w, ..circuit(120.0, 15.0, false) };
    close("block heater", loaded(400.0).continuous_w(&policy), 1040.0, 1e-12, LIBRARY);
    assert_eq!(loaded(2000.0).continuous_w(&policy), 0.0);
}

#[test]
fn current_and_voltage() {
    for (row, volts, three, power, want) in [
        ("132", 120.0, false, 1500.0, 12.5),
        ("133", 24.0, false, 500.0, 20.8333),
        ("134", 400.0, true, 6000.0, 8.660_25),
        ("135", 480.0, true, 4500.0, 5.412_66),
    ] {
        close(row, circuit(volts, 16.0, three).current_a(power), want, 1e-4, LIBRARY);
    }
    close("136", 1500.0 * heat::delivered_share(208.0, 240.0), 1126.67, 1e-4, LIBRARY);
}

const SIZES: &[f64] = &[250.0, 300.0, 500.0, 750.0, 1000.0, 1500.0, 2000.0, 3000.0];

fn wanted(needed_w: f64, needed_high_w: f64, carried_w: f64) -> Wanted {
    Wanted { needed_w, needed_high_w, carried_w, surface_w: f64::INFINITY, delivered: 1.0 }
}

#[test]
fn choosing_a_heater() {
    let fits = |elements: &[f64], tight| Chosen::Fits { elements: elements.to_vec(), tight };
    let small = |elements: &[f64]| Chosen::CircuitTooSmall { elements: elements.to_vec() };
    let all = f64::INFINITY;
    let on_208 = heat::delivered_share(208.0, 240.0);
    for (what, sizes, of, chosen) in [
        ("covers high", SIZES, wanted(600.0, 800.0, all), fits(&[1000.0], false)),
        ("just", SIZES, wanted(600.0, 750.0, 750.0), fits(&[750.0], false)),
        ("one tight before two", SIZES, wanted(600.0, 800.0, 900.0), fits(&[750.0], true)),
        ("two", &[500.0, 750.0], wanted(900.0, 1100.0, 1500.0), fits(&[500.0, 750.0], false)),
        ("two alike", &[500.0], wanted(700.0, 980.0, 1500.0), fits(&[500.0; 2], false)),
        ("two, tight", &[500.0], wanted(900.0, 1260.0, 1440.0), fits(&[500.0; 2], true)),
        ("three", &[500.0], wanted(1100.0, 1400.0, 1500.0), fits(&[500.0; 3], false)),
        ("any order", &[750.0, 250.0], wanted(800.0, 900.0, all), fits(&[750.0, 250.0], false)),
        ("circuit too small", SIZES, wanted(1800.0, 2400.0, 1440.0), small(&[3000.0])),
        ("nothing carried", SIZES, wanted(100.0, 140.0, 0.0), small(&[250.0])),
        ("1500 W on 15 A", &[1500.0], wanted(1000.0, 1400.0, 1440.0), small(&[1500.0])),
        ("no size", &[500.0], wanted(1600.0, 2000.0, all), Chosen::NoSize),
        ("no sizes at all", &[], wanted(100.0, 140.0, all), Chosen::NoSize),
        (
            "240 V elements on 208 V",
            SIZES,
            Wanted { delivered: on_208, ..wanted(600.0, 800.0, 3328.0) },
            fits(&[1500.0], false),
        ),
        (
            "pad, too large for its surface",
            SIZES,
            Wanted { surface_w: 200.0, ..wanted(300.0, 400.0, all) },
            Chosen::SurfaceTooSmall,
        ),
        (
            "pad, tight on its surface",
            SIZES,
            Wanted { surface_w: 350.0, ..wanted(290.0, 400.0, all) },
            fits(&[300.0], true),
        ),
    ] {
        assert_eq!(heat::choose(sizes, of), chosen, "{what} [this project's judgement]");
    }
}

/// A case anywhere in the range of machines: oils to ISO VG 100, air to -60 °C.
#[derive(Debug, Clone)]
struct Case {
    kv40: f64,
    kv100_share: f64,
    rho15: f64,
    litres: f64,
    steel: f64,
    area: f64,
    height: f64,
    length: f64,
    wind: f64,
    insulation: f64,
    air: f64,
    over: f64,
    rise: f64,
    hours: f64,
    factor: f64,
}

fn any_case() -> impl Strategy<Value = Case> {
    // ISO VG 5 to 100, viscosity indices from about 50 to over 250.
    let oil = (5.0_f64..110.0, 0.9_f64..1.6, 750.0..1150.0);
    let body = (1.0_f64..20_000.0, 0.0..5000.0);
    let shape = (0.2_f64..200.0, 0.02..5.0, 0.05..10.0);
    let weather = (0.0..40.0_f64, prop_oneof![Just(0.0), 0.01..5.0_f64], -60.0..20.0_f64);
    let way = (prop_oneof![Just(0.0), 0.0..40.0_f64], 0.1..70.0_f64, 0.1..96.0_f64, 1.0..1.4_f64);
    (oil, body, shape, weather, way).prop_map(|(oil, body, shape, weather, way)| Case {
        kv40: oil.0,
        kv100_share: oil.1,
        rho15: oil.2,
        litres: body.0,
        steel: body.1,
        area: shape.0,
        height: shape.1,
        length: shape.2,
        wind: weather.0,
        insulation: weather.1,
        air: weather.2,
        over: way.0,
        rise: way.1,
        hours: way.2,
        factor: way.3,
    })
}

impl Case {
    fn oil(&self) -> Oil {
        Oil::new(self.rho15, self.kv40, 0.52 * self.kv40.powf(0.67) * self.kv100_share)
    }

    fn loss<'a>(&self, oil: &'a Oil) -> TankLoss<'a> {
        let walls = Walls {
            height: self.height,
            length: self.length,
            wind: self.wind,
            insulation: self.insulation,
            emissivity: 0.9,
        };
        TankLoss::from_films(walls, oil.film(), 0.9, self.area, self.air)
    }

    fn capacity(&self, oil: &Oil) -> HeatCapacity {
        HeatCapacity::new(self.litres, &oil.bulk, self.steel, 440.0)
    }

    fn way(&self, oil: &Oil) -> WarmUp {
        let from = self.air + self.over;
        let target = from + self.rise;
        let curve = LossCurve::new(&self.loss(oil), target.max(90.0));
        WarmUp::new(&curve, &self.capacity(oil), from, target, self.factor)
    }

    fn needed(&self, oil: &Oil) -> f64 {
        self.way(oil).needed_power_w(self.hours * 3600.0)
    }
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn harder_never_needs_less(case in any_case(), by in 0.01_f64..1.0) {
        // Where the wall is so cold that the oil film sets, the correlation has a colder wall take less
        // heat: a bare tank under -60 °C in more than 12 m/s, by up to 4 %. Not within this:
        let case = Case { wind: case.wind * 0.25, air: case.air.max(-50.0), ..case };
        let oil = case.oil();
        prop_assume!(oil.curve.at(case.air + case.over + case.rise) < 2000.0);
        let base = case.needed(&oil);
        prop_assert!(base.is_finite() && base > 0.0, "{base}");
        // Interpolation may differ by this much between two curves.
        let least = base * (1.0 - 1e-4);
        let (air, over, rise) = (case.air - 10.0 * by, case.over + 10.0 * by, case.rise + 10.0 * by);
        let colder_air = Case { air, over, ..case.clone() };
        prop_assert!(colder_air.needed(&oil) >= least, "colder air");
        let colder_tank = Case { air, rise, ..case.clone() };
        prop_assert!(colder_tank.needed(&oil) >= least, "colder tank and air");
        let windy = Case { wind: case.wind + 2.0 * by, ..case.clone() };
        prop_assert!(windy.needed(&oil) >= least, "more wind");
        let hasty = Case { hours: case.hours * (1.0 - 0.9 * by), ..case.clone() };
        prop_assert!(hasty.needed(&oil) >= least, "less time");
        let hotter = Case { rise, ..case.clone() };
        prop_assert!(hotter.needed(&oil) >= least, "higher target");
        let lossier = Case { factor: case.factor * (1.0 + by), ..case.clone() };
        prop_assert!(lossier.needed(&oil) >= least, "more loss");
        let lagged = Case { insulation: case.insulation + by, ..case.clone() };
        prop_assert!(lagged.needed(&oil) <= base * (1.0 + 1e-4), "more insulation");
    }

    #[test]
    fn needed_power_and_time_are_inverse(case in any_case()) {
        let oil = case.oil();
        let way = case.way(&oil);
        let seconds = case.hours * 3600.0;
        let power = way.needed_power_w(seconds);
        let more = way.time_s(power * (1.0 + 1e-6)).unwrap();
        prop_assert!(more <= seconds, "{more} s, not {seconds}, at {power} W");
        if let Some(less) = way.time_s(power * (1.0 - 1e-6)) {
            prop_assert!(less >= seconds, "{less} s, not {seconds}, at {power} W");
        }
    }

    #[test]
    fn more_power_is_never_slower(case in any_case(), a in 0.5_f64..20.0, b in 1.0_f64..5.0) {
        let oil = case.oil();
        let way = case.way(&oil);
        let power = case.needed(&oil) * a;
        match (way.time_s(power), way.time_s(power * b)) {
            (Some(slow), Some(fast)) => prop_assert!(fast <= slow * (1.0 + 1e-9)),
            (Some(_), None) => prop_assert!(false, "more power never gets there"),
            _ => {}
        }
    }

    #[test]
    fn loss_is_finite_and_rises(case in any_case()) {
        let oil = case.oil();
        let loss = case.loss(&oil);
        let curve = LossCurve::new(&loss, 90.0);
        let mut last = (0.0, 0.0);
        for i in 1..40 {
            let t = case.air + (90.0 - case.air) * f64::from(i) / 40.0;
            let now = (loss.loss_w(t), curve.loss_w(t));
            prop_assert!(now.0.is_finite() && now.0 > last.0, "loss at {t} °C: {now:?} {last:?}");
            prop_assert!(now.1.is_finite() && now.1 > last.1, "curve at {t} °C: {now:?} {last:?}");
            prop_assert!((now.0 - now.1).abs() < 1e-3 * now.0, "at {t} °C: {now:?}");
            last = now;
        }
        prop_assert!(loss.extra_insulation(0.025, 0.040).loss_w(60.0) < loss.loss_w(60.0));
        let power = 30.0 * case.area;
        if let Some(steady) = heat::steady_c(&curve, &loss, power) {
            prop_assert!((loss.loss_w(steady) / power - 1.0).abs() < 1e-3, "{steady}");
        }
        let capacity = case.capacity(&oil);
        let cold = heat::parked_c(&curve, &capacity, 60.0, 12.0, 1.4, |_| case.air);
        prop_assert!(cold >= case.air && cold <= 60.0, "{cold}");
    }

    #[test]
    fn skins_rise_with_watt_density(
        case in any_case(), q in 0.01_f64..6.0, more in 1.01_f64..2.0, mm in 3.0_f64..60.0,
    ) {
        let oil = case.oil();
        let rod = rod(&oil, mm);
        let film = rod.skin_film(q, case.air).unwrap();
        let hotter = rod.skin_film(q * more, case.air).unwrap();
        prop_assert!(film > case.air && hotter > film, "{film} {hotter}");
        prop_assert!((rod.density_film(film, case.air) / q - 1.0).abs() < 1e-4);
        if let Some(bulk) = rod.skin_bulk(q, case.air) {
            prop_assert!(bulk >= film - 1e-3, "bulk properties are the pessimistic bound");
            prop_assert!((rod.density_bulk(bulk, case.air) / q - 1.0).abs() < 1e-4);
        }
        let policy = HeatPolicy::default();
        let most = |flash| rod.greatest_density(1.55, 40.0, case.air, flash, &policy);
        let (low, high, open) = (most(Some(180.0)), most(Some(220.0)), most(None));
        prop_assert!(0.0 <= low && low <= high && high <= open && open <= 1.55);
    }
}
