//! What must hold for every case: no invented numbers, continuity, and monotone answers.

use coldsump::advice::{self, Assessment, HeatingStatus, Outcome, Verdict};
use coldsump::case::{Case, CaseFile};
use coldsump::oil::{BandPolicy, Base, Class, Oil, OilData, Reach, viscosity_at_100};
use coldsump::quantity::{Density, KinematicViscosity, Temperature, ViscosityReading};
use proptest::prelude::*;

/// A random machine; every field is what `--set` would be given.
#[derive(Debug, Clone)]
struct Machine {
    minimum: f64,
    wind: f64,
    elevation: f64,
    bore: f64,
    length: f64,
    head: f64,
    litres: f64,
    hours: f64,
    start_rpm: f64,
    cm3: f64,
    base: Base,
    kv40: f64,
    index: f64,
    pour: f64,
    insulation: f64,
}

fn machine() -> impl Strategy<Value = Machine> {
    (
        (-52.0..-5.0_f64, 0.0..10.0_f64, 0.0..3500.0_f64, 25.0..120.0_f64, 0.3..4.0_f64),
        (-0.3..1.0_f64, 20.0..1500.0_f64, 1.0..12.0_f64, 500.0..1200.0_f64, 10.0..250.0_f64),
        (
            0..7_usize,
            10.0..68.0_f64,
            80.0..190.0_f64,
            -66.0..-9.0_f64,
            prop_oneof![Just(0.0), 10.0..50.0_f64],
        ),
    )
        .prop_map(
            |(
                (minimum, wind, elevation, bore, length),
                (head, litres, hours, start_rpm, cm3),
                (base, kv40, index, pour, insulation),
            )| Machine {
                minimum,
                wind,
                elevation,
                bore,
                length,
                head,
                litres,
                hours,
                start_rpm,
                cm3,
                base: Base::ALL[base],
                kv40,
                index,
                pour,
                insulation,
            },
        )
}

impl Machine {
    fn file(&self) -> CaseFile {
        let mut file = CaseFile::read("random", "format = 1\npump.kind = \"axial-piston\"\n");
        let kv100 = viscosity_at_100(self.kv40, self.index).unwrap();
        for (key, text) in [
            ("site.minimum_temperature", format!("{} °C", self.minimum)),
            ("site.wind", format!("{} m/s", self.wind)),
            ("site.elevation", format!("{} m", self.elevation)),
            ("pump.displacement", format!("{} cm³", self.cm3)),
            ("pump.start_speed", format!("{} rpm", self.start_rpm)),
            ("pump.inlet_pressure_work_min", "70 kPa".to_owned()),
            ("suction.bore", format!("{} mm", self.bore)),
            ("suction.length", format!("{} m", self.length)),
            ("suction.oil_above_pump", format!("{} m", self.head)),
            ("suction.fittings.elbow-90-long", "2".to_owned()),
            ("reservoir.oil_volume", format!("{} L", self.litres)),
            ("reservoir.insulation.thickness", format!("{} mm", self.insulation)),
            ("duty.time_to_warm", format!("{} h", self.hours)),
            ("oil[1].base", self.base.to_string()),
            ("oil[1].viscosity.40 °C", format!("{} mm²/s", self.kv40)),
            ("oil[1].viscosity.100 °C", format!("{kv100} mm²/s")),
            ("oil[1].pour_point", format!("{} °C", self.pour)),
        ] {
            file.set(key, &text).unwrap();
        }
        file
    }

    fn case(&self) -> Case {
        self.file().check().unwrap_or_else(|faults| panic!("{faults}"))
    }

    fn found(&self) -> Assessment {
        let case = self.case();
        advice::assess(&case, &case.oils[0])
    }
}

/// Floors as numbers that can be compared: unattainable is the warmest.
fn floors(found: &Assessment) -> [f64; 3] {
    [found.start_floor, found.light_floor, found.work_floor]
        .map(|floor| floor.at_c.unwrap_or(f64::INFINITY))
}

/// What two searches may differ by, K.
const CLOSE: f64 = 1e-4;

fn no_lower(after: &Assessment, before: &Assessment) -> Result<(), TestCaseError> {
    for (after, before) in floors(after).into_iter().zip(floors(before)) {
        prop_assert!(after >= before - CLOSE, "{after} after {before}");
    }
    Ok(())
}

fn config(cases: u32) -> ProptestConfig {
    ProptestConfig { failure_persistence: None, ..ProptestConfig::with_cases(cases) }
}

proptest! {
    #![proptest_config(config(256))]

    #[test]
    fn every_figure_is_a_number(machine in machine()) {
        let found = machine.found();
        let mut numbers = vec![found.soak_c, found.tank_soak_c, found.low_at_max];
        numbers.extend(floors(&found).into_iter().filter(|t| *t != f64::INFINITY));
        numbers.extend(found.limits.iter().filter_map(|row| row.outcome.temperature()));
        let h = &found.heating;
        numbers.extend([
            h.needed_w, h.needed_high_w, h.hold_w, h.u_value, h.time_s, h.energy_kwh, h.steady_c,
            h.mean_target_c, h.thermostat_c, h.gate_valid_s, h.watt_density_max, h.surface_cm2,
            h.skin_film_c, h.skin_bulk_c, found.circulation.time_s, found.circulation.steady_c,
            found.first_turn.hose_clearing_s, found.first_turn.hose_fill,
            found.first_turn.vacuum_at_gate_kpa, found.first_turn.speed_max_rpm,
        ].into_iter().flatten());
        for number in numbers {
            prop_assert!(number.is_finite(), "{found:?}");
        }
    }

    #[test]
    fn the_safe_side(machine in machine()) {
        let case = machine.case();
        let found = advice::assess(&case, &case.oils[0]);
        // Never under the pour point + margin; never a number below pour point + 5 K.
        if let Some(floor) = found.start_floor.at_c {
            prop_assert!(floor >= machine.pour + 10.0 - 1e-9);
        }
        if machine.minimum < machine.pour + 5.0 {
            prop_assert_eq!(found.at_soak.reach, Reach::BelowPour);
            prop_assert_eq!(found.at_soak.high, None);
        }
        // Tank heat never counts where the oil gels; a start never reads cold under its floor.
        if machine.minimum < machine.pour + 3.0 {
            prop_assert!(found.verdict == Verdict::NeedsWholeMachineHeat || found.verdict == Verdict::NotSuited);
            prop_assert_ne!(found.heating.status, HeatingStatus::Sized);
        }
        if matches!(found.verdict, Verdict::StartsCold) {
            prop_assert!(found.start_floor.at_c.is_some_and(|floor| machine.minimum >= floor));
            prop_assert!(found.limits.iter().all(|row| !matches!(row.outcome, Outcome::NotChecked(_))));
        }
        // A sized heater is in time, and its skin is under the limits.
        if found.heating.status == HeatingStatus::Sized {
            prop_assert!(found.heating.time_s.is_some_and(|s| s <= machine.hours * 3600.0 * (1.0 + 1e-6)));
            prop_assert!(found.heating.skin_film_c.is_some_and(|t| t <= 120.0 + 1e-2));
            if let Some(flash) = case.oils[0].flash_point() {
                prop_assert!(found.heating.skin_bulk_c.is_some_and(|t| t <= flash.as_celsius() - 30.0 + 1e-2));
            }
        }
    }

    #[test]
    fn higher_longer_narrower_never_lower_a_floor(
        machine in machine(),
        higher in 1.0..1500.0_f64,
        longer in 0.05..3.0_f64,
        narrower in 0.5..0.98_f64,
    ) {
        let before = machine.found();
        no_lower(&Machine { elevation: machine.elevation + higher, ..machine.clone() }.found(), &before)?;
        no_lower(&Machine { length: machine.length + longer, ..machine.clone() }.found(), &before)?;
        no_lower(&Machine { bore: machine.bore * narrower, ..machine.clone() }.found(), &before)?;
    }

    #[test]
    fn colder_windier_sooner_never_need_less_power(machine in machine(), colder in 0.5..6.0_f64) {
        let needed = |machine: &Machine| machine.found().heating.needed_w;
        let Some(before) = needed(&machine) else { return Ok(()) };
        let others = [
            Machine { minimum: machine.minimum - colder, ..machine.clone() },
            Machine { wind: machine.wind + colder, ..machine.clone() },
            Machine { hours: machine.hours * 0.8, ..machine.clone() },
        ];
        for other in others {
            // No figure where the target leaves what may be heated to: that is no lower either.
            if let Some(after) = needed(&other) {
                prop_assert!(after >= before * (1.0 - 1e-4), "{after} after {before}");
            }
        }
    }

    #[test]
    fn a_thicker_oil_never_has_a_lower_floor(machine in machine(), thicker in 1.01..1.8_f64) {
        // Thicker by one factor at every temperature: dense points, so that the lines keep the factor.
        let curve = |factor: f64| {
            let thin = machine.case();
            let mut file = machine.file();
            for t in [-60.0_f64, -50.0, -40.0, -30.0, -20.0, -10.0, 0.0, 20.0, 40.0, 60.0, 80.0, 100.0] {
                let key = format!("oil[1].viscosity.{t} °C");
                file.set(&key, &format!("{} mm²/s", (thin.oils[0].expected(t) * factor).min(1.9e7))).unwrap();
            }
            file.set("oil[1].pour_point", "-60 °C").unwrap();
            let case = file.check().unwrap_or_else(|faults| panic!("{faults}"));
            advice::assess(&case, &case.oils[0])
        };
        prop_assume!(machine.case().oils[0].expected(-60.0) * thicker < 1.8e7);
        no_lower(&curve(thicker), &curve(1.0))?;
    }

    #[test]
    fn a_higher_index_never_has_a_warmer_start_floor(machine in machine(), more in 1.0..60.0_f64) {
        let before = machine.found();
        let after = Machine { index: machine.index + more, ..machine.clone() }.found();
        let (after, before) = (floors(&after)[0], floors(&before)[0]);
        // Over 40 °C, where the two oils are equally thick, the one of higher index is the thicker.
        prop_assume!(before <= 40.0);
        prop_assert!(after <= before + CLOSE, "{after} after {before}");
    }

    #[test]
    fn the_range_is_continuous_and_falls_on_warming(machine in machine(), t in -70.0..115.0_f64) {
        let case = machine.case();
        let oil = &case.oils[0];
        let step = 1e-4;
        for edge in [Oil::low, Oil::expected, Oil::high] {
            let (cold, warm) = (edge(oil, t), edge(oil, t + step));
            prop_assert!(cold >= warm, "{cold} then {warm} at {t}");
            prop_assert!(cold / warm < 1.001, "{cold} then {warm} at {t}");
        }
        prop_assert!(oil.low(t) <= oil.expected(t) && oil.expected(t) <= oil.high(t));
    }

    #[test]
    fn a_measured_point_on_the_line_never_thickens_the_thick_edge(
        base in 0..7_usize,
        kv40 in 10.0..68.0_f64,
        index in 80.0..190.0_f64,
        at in -40.0..30.0_f64,
        t in -60.0..60.0_f64,
    ) {
        let oil = |extra: Option<(f64, f64)>| {
            let mut points = vec![(40.0, kv40), (100.0, viscosity_at_100(kv40, index).unwrap())];
            points.extend(extra);
            let points = points
                .into_iter()
                .map(|(t, nu)| {
                    let nu = KinematicViscosity::mm2_per_s(nu).unwrap();
                    (Temperature::celsius(t).unwrap(), ViscosityReading::Kinematic(nu))
                })
                .collect();
            let data = OilData {
                name: "oil".to_owned(),
                class: None,
                in_service: false,
                base: Base::ALL[base],
                points,
                viscosity_index: None,
                density: Density::kg_per_m3(875.0).unwrap(),
                pour_point: Temperature::celsius(-60.0).ok(),
                cloud_point: None,
                flash_point: None,
                biodegradable: None,
                reference_only: false,
            };
            Oil::from_data(data, &BandPolicy::default()).unwrap()
        };
        let plain = oil(None);
        let measured = oil(Some((at, plain.expected(at))));
        prop_assert!(measured.high(t) <= plain.high(t) * (1.0 + 1e-9));
    }
}

#[test]
fn classes_have_a_continuous_range_too() {
    for class in Class::all() {
        let oil = Oil::from_class(class, &BandPolicy::default()).unwrap();
        let mut t = -70.0;
        while t < 110.0 {
            for edge in [Oil::low, Oil::expected, Oil::high] {
                let (cold, warm) = (edge(&oil, t), edge(&oil, t + 0.01));
                assert!(cold >= warm * (1.0 - 1e-12), "{} at {t}: {cold} then {warm}", class.id());
                assert!(cold / warm < 1.02, "{} at {t}: {cold} then {warm}", class.id());
            }
            assert!(oil.low(t) <= oil.expected(t), "{} at {t}", class.id());
            assert!(oil.expected(t) <= oil.high(t), "{} at {t}", class.id());
            t += 0.01;
        }
        // The published limit caps the thick edge at its own temperature.
        if let Some(limit) = class.cold_limit() {
            assert!(oil.high(limit.at_c) <= limit.viscosity * (1.0 + 1e-9), "{}", class.id());
        }
    }
}
