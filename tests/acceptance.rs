//! What a seasoned engineer expects of given machines: ranges of common practice, no source, set
//! without looking at the program's output. Powers are those needed; the heater is the next size up
//! that also covers a tank which loses 40 % more.

use coldsump::advice::{self, Advice, Assessment, HeatingStatus, LimitId, Plan, PlanKind};
use coldsump::case::{Case, CaseFile};

/// A mid-size loader.
const LOADER: &str = r#"
format = 1
title = "loader"
[pump]
kind = "axial-piston"
neutral = "load-sensing"
displacement = "75 cm³"
start_speed = "850 rpm"
work_speed = "2100 rpm"
viscosity_start_max = "1600 mm²/s"
viscosity_work_max = "400 mm²/s"
viscosity_min = "10 mm²/s"
inlet_pressure_start_min = "60 kPa"
inlet_pressure_work_min = "80 kPa"
[suction]
bore = "50.8 mm"
length = "1.5 m"
oil_above_pump = "0.5 m"
fittings = { "elbow-90-long" = 2, "butterfly" = 1 }
[reservoir]
oil_volume = "200 L"
steel_mass = "40 kg"
surface = "2.36 m²"
height = "0.42 m"
length = "0.8 m"
exposure = "enclosed"
[circuit]
oil_volume = "300 L"
steel_mass = "250 kg"
[duty]
time_to_warm = "4 h"
[supply]
voltage = "230 V"
current = "16 A"
"#;

const HM46: &[(&str, &str)] = &[
    ("oil.base", "mineral"),
    ("oil.viscosity.40 °C", "46 mm²/s"),
    ("oil.viscosity.100 °C", "6.8 mm²/s"),
    ("oil.pour_point", "-24 °C"),
];
const HV32: &[(&str, &str)] = &[
    ("oil.base", "polymer-thickened"),
    ("oil.viscosity.40 °C", "32 mm²/s"),
    ("oil.viscosity.100 °C", "6.3 mm²/s"),
    ("oil.pour_point", "-39 °C"),
];
const HV22: &[(&str, &str)] = &[
    ("oil.base", "polymer-thickened"),
    ("oil.viscosity.40 °C", "22 mm²/s"),
    ("oil.viscosity.100 °C", "4.9 mm²/s"),
    ("oil.pour_point", "-42 °C"),
];
const PAO22: &[(&str, &str)] = &[
    ("oil.base", "pao"),
    ("oil.viscosity.40 °C", "22 mm²/s"),
    ("oil.viscosity.100 °C", "4.6 mm²/s"),
    ("oil.pour_point", "-60 °C"),
];
const HV15: &[(&str, &str)] = &[
    ("oil.base", "polymer-thickened"),
    ("oil.viscosity.40 °C", "15 mm²/s"),
    ("oil.viscosity.100 °C", "3.9 mm²/s"),
    ("oil.pour_point", "-48 °C"),
];

fn case(minimum: &str, sets: &[&[(&str, &str)]]) -> Case {
    let mut file = CaseFile::read("loader", LOADER);
    file.set("site.minimum_temperature", minimum).unwrap();
    for (key, text) in sets.iter().copied().flatten() {
        file.set(key, text).unwrap();
    }
    file.check().unwrap_or_else(|faults| panic!("{faults}"))
}

fn found(minimum: &str, sets: &[&[(&str, &str)]]) -> Assessment {
    let case = case(minimum, sets);
    advice::assess(&case, &case.oils[0])
}

#[track_caller]
fn between(value: Option<f64>, from: f64, to: f64) {
    assert!(value.is_some_and(|value| (from..=to).contains(&value)), "{value:?}: {from} to {to}");
}

#[test]
fn case_1_hv_32_at_minus_20() {
    let found = found("-20 °C", &[HV32]);
    between(found.start_floor.at_c, -23.0, -17.0);
    assert_eq!(found.start_floor.set_by, Some(LimitId::ViscosityStart));
    match found.heating.needed_w {
        None => assert_eq!(found.heating.status, HeatingStatus::NotNeeded),
        Some(watts) => assert!(watts <= 250.0, "{watts}"),
    }
    assert!(found.heating.heater_w.is_none_or(|watts| watts <= 600.0));
    between(found.light_floor.at_c, -8.0, -2.0);
    assert!(found.work_floor.at_c.is_some_and(|t| t <= 8.0));
}

#[test]
fn case_2_hm_46_at_minus_20() {
    let found = found("-20 °C", &[HM46]);
    assert!(!found.verdict.id().starts_with("starts-cold"));
    between(found.start_floor.at_c, -12.0, -7.0);
    between(found.heating.needed_w, 300.0, 700.0);
    between(found.work_floor.at_c, 3.0, 15.0);
}

#[test]
fn case_3_thin_oils_at_minus_30() {
    for oil in [HV22, PAO22] {
        let found = found("-30 °C", &[oil]);
        between(found.start_floor.at_c, -29.0, -23.0);
        between(found.heating.needed_w, 150.0, 400.0);
        between(Some(found.low_at_max), 11.0, 14.0);
        assert_ne!(found.verdict.id(), "not-suited");
    }
    let found = found("-30 °C", &[HV15]);
    between(found.start_floor.at_c, -34.0, -28.0);
    assert!(found.reasons.iter().any(|reason| reason.id == "thin-hot"), "{:?}", found.reasons);
}

#[test]
fn case_4_at_minus_40() {
    let gels = found("-40 °C", &[HM46]);
    assert_eq!(gels.heating.status, HeatingStatus::CannotReach);
    assert_eq!(gels.verdict.id(), "needs-whole-machine-heat");

    let blanket: &[(&str, &str)] = &[("reservoir.insulation.thickness", "25 mm")];
    let pao = found("-40 °C", &[PAO22, blanket]);
    between(pao.heating.needed_w, 300.0, 600.0);
    between(pao.heating.hold_w, 40.0, 120.0);

    let arctic: &[(&str, &str)] = &[
        ("oil.base", "polymer-thickened"),
        ("oil.viscosity.40 °C", "13.2 mm²/s"),
        ("oil.cold_viscosity.-40 °C", "600 mm²/s"),
        ("oil.pour_point", "-60 °C"),
        ("duty.oil_temperature_max", "35 °C"),
    ];
    let arctic = found("-40 °C", &[arctic]);
    between(arctic.start_floor.at_c, -50.0, -43.0);
    assert_eq!(arctic.verdict.id(), "starts-cold");
}

#[test]
fn case_5_at_minus_50_no_class_starts_unaided() {
    let case = case("-50 °C", &[]);
    for oil in case.oils.iter().filter(|oil| !oil.reference_only()) {
        let found = advice::assess(&case, oil);
        assert!(!found.verdict.id().starts_with("starts-cold"), "{}", oil.name());
    }
}

#[test]
fn case_6_parked_warm() {
    let parked: &[(&str, &str)] = &[
        ("duty.credit_parked_heat", "true"),
        ("duty.parked_at", "18:00"),
        ("duty.parked_oil", "50 °C"),
        ("duty.shift_start", "06:00"),
    ];
    let blanket: &[(&str, &str)] = &[("reservoir.insulation.thickness", "25 mm")];
    let warm = found("-30 °C", &[HV22, parked, blanket]);
    between(Some(warm.tank_soak_c), 12.0, 25.0);
    assert_eq!(warm.heating.status, HeatingStatus::NotNeeded);
    assert_eq!(warm.verdict.id(), "needs-heat");
    assert!(warm.reasons.iter().any(|reason| reason.id == "pump-cold"));
    let bare = found("-30 °C", &[HV22, parked]);
    between(Some(bare.tank_soak_c), -27.0, -18.0);
}

#[test]
fn case_7_a_higher_index_never_starts_warmer() {
    let mut coldest = f64::INFINITY;
    for index in [110, 120, 130, 140, 152, 160, 170, 184, 200] {
        let index = index.to_string();
        let oil: &[(&str, &str)] = &[
            ("oil.base", "polymer-thickened"),
            ("oil.viscosity.40 °C", "32 mm²/s"),
            ("oil.viscosity_index", &index),
            ("oil.pour_point", "-39 °C"),
        ];
        let floor = found("-20 °C", &[oil]).start_floor.at_c.unwrap();
        assert!(floor <= coldest + 1e-6, "index {index}: {floor} after {coldest}");
        coldest = floor;
    }
    // No HV class works colder than it should: none has a warmer work floor than the HM of its grade.
    let case = case("-20 °C", &[]);
    let work = |name: &str| {
        let oil = case.oils.iter().find(|oil| oil.name() == name).unwrap();
        advice::assess(&case, oil).work_floor.at_c.unwrap()
    };
    for grade in [15, 22, 32, 46, 68] {
        let (hv, hm) = (work(&format!("HV-{grade}")), work(&format!("HM-{grade}")));
        assert!(hv <= hm, "VG {grade}: HV {hv}, HM {hm}");
    }
}

#[test]
fn case_8_a_measured_point_on_the_line_never_warms_a_floor() {
    let case_of = |sets: &[&[(&str, &str)]]| case("-30 °C", sets);
    let plain = case_of(&[HV32]);
    for at in [-30.0, -25.0, -20.0, -10.0, 0.0, 20.0] {
        let nu = plain.oils[0].expected(at).to_string() + " mm²/s";
        let key = format!("oil.cold_viscosity.{at} °C");
        let measured = case_of(&[HV32, &[(&key, &nu)]]);
        let (a, b) =
            (advice::assess(&plain, &plain.oils[0]), advice::assess(&measured, &measured.oils[0]));
        for (without, with) in [
            (a.start_floor, b.start_floor),
            (a.light_floor, b.light_floor),
            (a.work_floor, b.work_floor),
        ] {
            let (without, with) = (without.at_c.unwrap(), with.at_c.unwrap());
            assert!(with <= without + 1e-4, "measured at {at}: {with} after {without}");
            assert!((with - at).abs() > 1e-3, "a floor sticks to the measurement at {at}");
        }
    }
}

#[test]
fn case_9_no_suction_line_is_never_a_plain_cold_start() {
    let found = found("-5 °C", &[PAO22, &[("suction", "none")]]);
    assert_eq!(found.verdict.id(), "starts-cold-inlet-unproven");
    let text = &found.reasons.iter().find(|reason| reason.id == "inlet-unproven").unwrap().text;
    let text = format!("{text:?}");
    assert!(text.contains("outside diameter") && text.contains("length"), "{text}");
}

#[test]
fn case_10_pao_46_at_minus_40() {
    let case = case(
        "-40 °C",
        &[&[
            ("oil.base", "pao"),
            ("oil.viscosity.40 °C", "46 mm²/s"),
            ("oil.viscosity.100 °C", "7.8 mm²/s"),
            ("oil.pour_point", "-60 °C"),
        ]],
    );
    between(Some(case.oils[0].expected(-40.0)), 17_000.0, 35_000.0);
    assert!(case.oils[0].high(-40.0) <= 40_000.0);
}

#[test]
fn case_11_vegetable_oil_left_standing() {
    let oil: &[(&str, &str)] = &[
        ("oil.base", "natural-ester"),
        ("oil.viscosity.40 °C", "36 mm²/s"),
        ("oil.viscosity.100 °C", "8.2 mm²/s"),
        ("oil.pour_point", "-33 °C"),
        ("duty.standing", "5 d"),
    ];
    let found = found("-25 °C", &[oil]);
    assert!(!found.verdict.id().starts_with("starts-cold"), "{}", found.verdict.id());
    assert!(found.reasons.iter().any(|reason| reason.id == "standing"));
}

#[test]
fn case_12_an_element_above_the_suction() {
    for power in ["500 W", "3000 W"] {
        let above: &[(&str, &str)] =
            &[("element.place", "above-suction"), ("element.power", power)];
        let found = found("-30 °C", &[HV22, above]);
        assert_eq!(found.heating.status, HeatingStatus::CannotReach);
        assert!(found.heating.whys.contains(&advice::HeatingWhy::AboveSuction));
        assert!(found.heating.fitted.is_some_and(|f| f.status == HeatingStatus::CannotReach));
    }
}

// From here on the whole advice.

/// The loader with several oils, the first in service.
fn advised(minimum: &str, oils: &[&[(&str, &str)]], sets: &[(&str, &str)]) -> Advice {
    let mut file = CaseFile::read("loader", LOADER);
    file.set("site.minimum_temperature", minimum).unwrap();
    for (at, oil) in oils.iter().enumerate() {
        for (key, text) in *oil {
            file.set(&key.replacen("oil.", &format!("oil[{}].", at + 1), 1), text).unwrap();
        }
    }
    if !oils.is_empty() {
        file.set("oil[1].in_service", "true").unwrap();
    }
    for (key, text) in sets {
        file.set(key, text).unwrap();
    }
    let case = file.check().unwrap_or_else(|faults| panic!("{faults}"));
    advice::advise(&case)
}

fn plan_of(advice: &Advice, kind: PlanKind, oil: usize) -> &Plan {
    advice
        .decision
        .plans
        .iter()
        .find(|plan| plan.kind == kind && plan.oil == oil)
        .unwrap_or_else(|| panic!("no plan {kind} for oil {oil}"))
}

fn has_caution(advice: &Advice, id: &str) -> bool {
    advice.cautions.iter().any(|caution| caution.row.id == id)
}

fn has_stop(advice: &Advice, id: &str) -> bool {
    advice.cautions.iter().any(|caution| caution.row.id == id && caution.row.stop)
}

#[test]
fn case_2_keeping_and_changing_the_oil_are_both_shown() {
    let advice = advised("-20 °C", &[HM46, HV32, HV22], &[]);
    let heat = plan_of(&advice, PlanKind::Heat, 0);
    assert!(heat.allowed, "{heat:?}");
    between(advice.decision.oils[0].heating.needed_w, 300.0, 700.0);
    assert!(plan_of(&advice, PlanKind::ChangeOil, 2).allowed);
    assert!(!plan_of(&advice, PlanKind::StartCold, 0).allowed);
    assert_eq!(advice.decision.chosen().unwrap().kind, PlanKind::ChangeOil);
    let kept = advised("-20 °C", &[HM46, HV32, HV22], &[("duty.prefer", "heater")]);
    assert_eq!(kept.decision.chosen().unwrap().kind, PlanKind::Heat);
}

#[test]
fn case_3_lower_speed_and_the_next_thinner_class_would_help() {
    for (oil, class) in [(HV22, "HV 22"), (PAO22, "HS 22")] {
        // Where the inlet governs at start, a lower speed helps.
        let advice = advised(
            "-30 °C",
            &[oil],
            &[("oil.class", class), ("suction.bore", "38.1 mm"), ("suction.length", "2 m")],
        );
        let ids: Vec<&str> = advice.levers.iter().map(|lever| lever.id).collect();
        assert!(ids.contains(&"start-speed"), "{ids:?}");
        assert!(ids.contains(&"thinner-class"), "{ids:?}");
        assert!(ids.contains(&"bigger-bore"), "{ids:?}");
    }
}

#[test]
fn case_4_the_whole_machine_or_another_oil() {
    let advice = advised("-40 °C", &[HM46, PAO22], &[("reservoir.insulation.thickness", "25 mm")]);
    assert!(!plan_of(&advice, PlanKind::Heat, 0).allowed);
    assert!(plan_of(&advice, PlanKind::WholeMachineHeat, 0).allowed);
    assert_eq!(advice.decision.chosen().unwrap().kind, PlanKind::ChangeAndHeat);

    let fluid = [("oil[1].class", "MIL-PRF-5606"), ("duty.oil_temperature_max", "35 °C")];
    let listed = advised("-40 °C", &[], &fluid);
    assert_eq!(listed.decision.chosen().unwrap().kind, PlanKind::StartCold);
    let classes = advised("-40 °C", &[], &[("duty.oil_temperature_max", "35 °C")]);
    let chosen = classes.decision.chosen().unwrap();
    assert!(classes.decision.starts());
    // A reference fluid is compared, never chosen unless listed.
    let case = case("-40 °C", &[]);
    assert!(!case.oils[chosen.oil].reference_only());
}

#[test]
fn case_4_a_low_flash_point_is_a_caution_at_a_heater() {
    let sets = [("oil[1].flash_point", "82 °C"), ("duty.prefer", "heater")];
    let advice = advised("-34 °C", &[PAO22], &sets);
    assert!(advice.decision.chosen().unwrap().kind.heats());
    assert!(has_caution(&advice, "flash-point"));
    assert!(!has_caution(&advised("-34 °C", &[PAO22], &[]), "flash-point"));
}

#[test]
fn case_5_at_minus_50_keep_it_running_or_store_it_warm() {
    let advice = advised("-50 °C", &[], &[]);
    let chosen = advice.decision.chosen().unwrap();
    assert!(!chosen.kind.starts() || chosen.kind.heats(), "{chosen:?}");
    assert!(!advice.decision.plans.iter().any(|plan| {
        plan.allowed
            && matches!(plan.kind, PlanKind::StartCold | PlanKind::ChangeOil)
            && !case("-50 °C", &[]).oils[plan.oil].reference_only()
    }));
    assert!(advice.decision.plans.iter().any(|plan| plan.kind == PlanKind::KeepRunning));
    assert!(advice.decision.plans.iter().any(|plan| plan.kind == PlanKind::WholeMachineHeat));
    assert!(has_stop(&advice, "hose-rating") && has_stop(&advice, "lifting-stop"));
}

#[test]
fn case_6_a_warm_tank_is_not_a_ready_machine() {
    let parked = [
        ("duty.credit_parked_heat", "true"),
        ("duty.parked_at", "18:00"),
        ("duty.parked_oil", "50 °C"),
        ("reservoir.insulation.thickness", "25 mm"),
    ];
    let advice = advised("-30 °C", &[HV22], &parked);
    let plan = advice.decision.chosen().unwrap();
    assert_eq!(plan.kind, PlanKind::StartWarmTank);
    let pump = advice
        .procedure
        .iter()
        .find(|step| step.gate.is_some_and(|gate| gate.reading == advice::Reading::PumpBody));
    assert!(pump.is_some(), "no pump-warming step");
    assert!(has_caution(&advice, "hot-oil-cold-pump"));
}

#[test]
fn case_12_the_lever_moves_the_element() {
    let advice = advised("-30 °C", &[HV22], &[("element.place", "above-suction")]);
    assert_eq!(advice.levers[0].id, "element-below", "{:?}", advice.levers[0].text);
}

#[test]
fn case_13_a_1500_w_element_on_120_v_15_a() {
    let sets = [
        ("supply.voltage", "120 V"),
        ("supply.current", "15 A"),
        ("element.power", "1500 W"),
        ("element.surface", "2400 cm²"),
    ];
    let found = found("-30 °C", &[HV22, &sets]);
    let fitted = found.heating.fitted.unwrap();
    assert_eq!(fitted.status, HeatingStatus::CircuitTooSmall);
    assert_ne!(found.heating.heater_w, Some(1500.0));
}

#[test]
fn case_14_what_to_ask_any_supplier_for() {
    let ask = advised("-38 °C", &[], &[]).ask_for;
    assert!(ask.pour_point_max_c <= -48.0);
    assert_eq!(ask.at_c, -38.0);
    assert!(ask.viscosity_max.unwrap() <= 1600.0);
    assert!(ask.viscosity_min >= 10.0);
    let grades: Vec<u32> = ask.grades.iter().map(|(grade, _)| *grade).collect();
    assert_eq!(grades, [15, 22]);
    assert!(ask.grades[1].1 > 190.0, "VG 22 at best: {:?}", ask.grades);
    // At -50 °C no ordinary oil can.
    let none = advised("-50 °C", &[], &[]).ask_for;
    assert!(none.grades.is_empty() && none.why.is_some(), "{none:?}");
}

#[test]
fn case_15_ester_hoses_and_the_hose_stop() {
    let ester: &[(&str, &str)] = &[
        ("oil.base", "ester"),
        ("oil.viscosity.40 °C", "22 mm²/s"),
        ("oil.viscosity.100 °C", "4.9 mm²/s"),
        ("oil.pour_point", "-54 °C"),
    ];
    assert!(has_caution(&advised("-25 °C", &[ester], &[]), "ester-hoses"));
    assert!(!has_caution(&advised("-25 °C", &[HV22], &[]), "ester-hoses"));
    for oil in [ester, HM46, HV22, PAO22] {
        assert!(has_stop(&advised("-41 °C", &[oil], &[]), "hose-rating"));
        assert!(!has_caution(&advised("-39 °C", &[oil], &[]), "hose-rating"));
    }
}

// Traps that once gave a figure nobody should bet a pump on.

#[test]
fn full_load_is_never_released_colder_than_light_work() {
    for elevation in ["0 m", "1500 m", "2000 m", "2200 m", "2500 m", "3500 m"] {
        for bore in ["38.1 mm", "50.8 mm", "76.2 mm"] {
            let sets: &[(&str, &str)] = &[
                ("site.elevation", elevation),
                ("suction.bore", bore),
                ("pump.inlet_pressure_work_min", "none"),
            ];
            let found = found("-30 °C", &[PAO22, sets]);
            if let (Some(light), Some(work)) = (found.light_floor.at_c, found.work_floor.at_c) {
                assert!(work >= light, "{elevation}, {bore}: full {work}, light {light}");
            }
        }
    }
}

#[test]
fn what_the_label_says_beside_a_class_counts() {
    let class: &[(&str, &str)] = &[("oil.class", "HM 46"), ("oil.pour_point", "0 °C")];
    let found = found("-14 °C", &[class]);
    assert_eq!(found.limits[0].outcome.temperature(), Some(10.0));
    let better: &[(&str, &str)] = &[
        ("oil.class", "HM 46"),
        ("oil.pour_point", "-40 °C"),
        ("oil.flash_point", "150 °C"),
        ("oil.density", "890 kg/m³"),
    ];
    let case = case("-14 °C", &[better]);
    let oil = &case.oils[0];
    assert_eq!(oil.pour_point().map(|t| t.as_celsius()), Some(-40.0));
    assert_eq!(oil.flash_point().map(|t| t.as_celsius()), Some(150.0));
    assert_eq!(oil.bulk().density_15(), 890.0);
}

#[test]
fn a_fitted_element_of_unknown_surface_was_not_checked() {
    let sets: &[(&str, &str)] = &[("element.power", "500 W")];
    let heating = found("-30 °C", &[PAO22, sets]).heating;
    let fitted = heating.fitted.unwrap();
    assert_eq!(fitted.status, HeatingStatus::NotChecked);
    assert!(fitted.whys.contains(&advice::HeatingWhy::SurfaceUnknown));
    assert_eq!((heating.watt_density, heating.surface_cm2), (None, None));
}

#[test]
fn no_element_on_more_than_its_voltage() {
    for power in [None, Some(("element.power", "500 W"))] {
        let mut sets = vec![("element.rated_voltage", "120 V"), ("element.surface", "2000 cm²")];
        sets.extend(power);
        if power.is_none() {
            sets.pop();
        }
        let heating = found("-30 °C", &[PAO22, &sets]).heating;
        assert_eq!(heating.status, HeatingStatus::CannotReach);
        assert!(heating.whys.contains(&advice::HeatingWhy::OverVoltage), "{:?}", heating.whys);
    }
}

#[test]
fn parked_heat_is_no_heat_after_a_weekend_and_none_in_the_pump() {
    let parked: &[(&str, &str)] = &[
        ("duty.credit_parked_heat", "true"),
        ("duty.parked_at", "18:00"),
        ("duty.parked_oil", "50 °C"),
        ("reservoir.insulation.thickness", "25 mm"),
    ];
    let warm = found("-30 °C", &[HV22, parked]);
    let difference = warm.first_turn.pump_difference_k.unwrap();
    assert!((difference - (warm.tank_soak_c + 30.0)).abs() < 1e-9, "{difference}");
    assert!(warm.heating.pump_warming);
    let weekend: &[(&str, &str)] = &[("duty.standing", "60 h")];
    let cold = found("-30 °C", &[HV22, parked, weekend]);
    assert!((cold.tank_soak_c + 30.0).abs() < 1e-9, "{}", cold.tank_soak_c);
}

#[test]
fn a_tank_as_cold_as_the_pump_is_no_warm_tank() {
    let advice = advised("-27 °C", &[PAO22], &[("site.heating_temperature", "-22 °C")]);
    let found = &advice.decision.oils[0];
    if found.heating.status == HeatingStatus::NotNeeded && found.verdict.id() == "needs-heat" {
        assert!(!plan_of(&advice, PlanKind::StartWarmTank, 0).allowed);
        let ids: Vec<&str> = advice.levers.iter().map(|lever| lever.id).collect();
        assert!(ids.contains(&"size-for-the-minimum"), "{ids:?}");
    } else {
        panic!("the case no longer is the trap: {:?}", found.verdict);
    }
}
