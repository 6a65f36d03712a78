//! The advice as users and other programs meet it: pointers, schema, levers, evidence, what changes
//! when the case does, and the safe side on random cases.
#![cfg(feature = "cli")]

use coldsump::advice::{self, Bound, HeatingStatus, Phase, PlanKind, Reading, Verdict};
use coldsump::case::{Case, CaseFile, Units};
use coldsump::report;
use serde_json::Value;
use std::collections::{BTreeMap, BTreeSet};

/// Names and texts of all example cases.
fn examples() -> Vec<(String, String)> {
    let mut found: Vec<(String, String)> = std::fs::read_dir("examples")
        .unwrap()
        .map(|entry| entry.unwrap().path())
        .filter(|path| path.extension().is_some_and(|end| end == "toml"))
        .map(|path| {
            let name = path.file_name().unwrap().to_string_lossy().into_owned();
            (name, std::fs::read_to_string(&path).unwrap())
        })
        .collect();
    found.sort();
    assert!(found.len() >= 3);
    found
}

fn checked(name: &str, text: &str, sets: &[(&str, &str)]) -> Case {
    let mut file = CaseFile::read(name, text);
    for (key, value) in sets {
        file.set(key, value).unwrap();
    }
    file.check().unwrap_or_else(|faults| panic!("{faults}"))
}

fn json(case: &Case) -> Value {
    report::advice_json(case, &advice::advise(case))
}

/// Every pointer in a JSON value with its value, down to the leaves.
fn leaves(value: &Value, at: &str, out: &mut BTreeMap<String, Value>) {
    match value {
        Value::Object(map) => {
            for (key, inner) in map {
                let key = key.replace('~', "~0").replace('/', "~1");
                leaves(inner, &format!("{at}/{key}"), out);
            }
        }
        Value::Array(list) => {
            for (row, inner) in list.iter().enumerate() {
                leaves(inner, &format!("{at}/{row}"), out);
            }
        }
        leaf => {
            out.insert(at.to_owned(), leaf.clone());
        }
    }
}

fn flat(value: &Value) -> BTreeMap<String, Value> {
    let mut out = BTreeMap::new();
    leaves(value, "", &mut out);
    out
}

/// Runs of digits with their decimal point.
fn numbers(text: &str) -> Vec<String> {
    let mut found = Vec::new();
    let mut run = String::new();
    for c in text.chars().chain([' ']) {
        if c.is_ascii_digit() || (c == '.' && !run.is_empty()) {
            run.push(c);
        } else if !run.is_empty() {
            found.push(run.trim_end_matches('.').to_owned());
            run.clear();
        }
    }
    found
}

#[test]
fn every_figure_shown_is_a_key_of_the_json() {
    for (name, text) in examples() {
        let case = checked(&name, &text, &[]);
        let advice = advice::advise(&case);
        let json = report::advice_json(&case, &advice);
        let strings: BTreeSet<String> = flat(&json)
            .into_values()
            .flat_map(|value| match value {
                Value::String(text) => numbers(&text),
                Value::Number(number) => numbers(&number.to_string()),
                _ => Vec::new(),
            })
            .collect();
        for units in [Units::Metric, Units::Us] {
            let document = report::advice(&case, &advice, units);
            let mut pointers = 0;
            for pointer in document.pointers() {
                let value = json.pointer(pointer);
                assert!(
                    value.is_some_and(|value| value.is_number() || value.is_string()),
                    "{name}: {pointer} is {value:?}"
                );
                pointers += 1;
            }
            assert!(pointers > 60, "{name}: only {pointers} figures");
            // Figures that stand in plain words: constants of the text, in the JSON's words too.
            for block in &document.blocks {
                for span in block.lines().into_iter().flat_map(|line| &line.0) {
                    if span.pointer.is_some() {
                        continue;
                    }
                    for number in numbers(&span.text) {
                        assert!(
                            strings.contains(&number)
                                || KNOWN_WORDS.iter().any(|w| span.text.contains(w)),
                            "{name}: {number} of `{}` is nowhere in the JSON",
                            span.text
                        );
                    }
                }
            }
        }
    }
}

/// Words of the page with numbers that are names: standards and counts of the page itself.
const KNOWN_WORDS: &[&str] = &["ASTM D2983", "more in the JSON", "plans that are not allowed"];

#[test]
fn metric_figures_are_the_json_values_rounded() {
    for (name, text) in examples() {
        let case = checked(&name, &text, &[]);
        let advice = advice::advise(&case);
        let json = report::advice_json(&case, &advice);
        let document = report::advice(&case, &advice, Units::Metric);
        let mut compared = 0;
        for span in document.blocks.iter().flat_map(|b| b.lines()).flat_map(|line| &line.0) {
            let Some(value) = span.pointer.as_ref().and_then(|p| json.pointer(p)?.as_f64()) else {
                continue;
            };
            let Some(shown) = span.text.strip_suffix(" °C") else { continue };
            let shown: f64 = shown.parse().unwrap();
            assert!((shown - value).abs() <= 0.0501, "{name}: {} for {value}", span.text);
            compared += 1;
        }
        assert!(compared > 20, "{name}: only {compared}");
    }
}

#[test]
fn the_json_keeps_to_the_schema() {
    let mut schema: Value =
        serde_json::from_str(include_str!("../src/report/advice.schema.json")).unwrap();
    close(&mut schema);
    let validator = jsonschema::draft7::new(&schema).unwrap();
    for (name, text) in examples() {
        let json = json(&checked(&name, &text, &[]));
        let errors: Vec<String> = validator
            .iter_errors(&json)
            .map(|error| format!("{}: {error}", error.instance_path()))
            .collect();
        assert!(errors.is_empty(), "{name}:\n{}", errors.join("\n"));
        nulls_are_explained(&name, "", &json);
    }
    // The schema is not one that lets everything pass.
    let mut broken = json(&checked("x", &examples()[0].1, &[]));
    broken["oils"][0]["verdict"] = Value::from("fine");
    assert!(!validator.is_valid(&broken));
}

/// For the test every object is closed: a key the schema does not describe is an error here.
fn close(schema: &mut Value) {
    match schema {
        Value::Object(map) => {
            if map.contains_key("properties") && !map.contains_key("additionalProperties") {
                map.insert("additionalProperties".to_owned(), Value::Bool(false));
            }
            map.values_mut().for_each(close);
        }
        Value::Array(list) => list.iter_mut().for_each(close),
        _ => {}
    }
}

fn nulls_are_explained(name: &str, at: &str, value: &Value) {
    match value {
        Value::Object(map) => {
            for (key, inner) in map {
                if inner.is_null() {
                    let why = map.get("why").map(ToString::to_string).unwrap_or_default();
                    assert!(why.contains(key.as_str()), "{name}: {at}/{key} is null, why: {why}");
                }
                nulls_are_explained(name, &format!("{at}/{key}"), inner);
            }
        }
        Value::Array(list) => {
            for (row, inner) in list.iter().enumerate() {
                nulls_are_explained(name, &format!("{at}/{row}"), inner);
            }
        }
        _ => {}
    }
}

#[test]
fn every_number_of_the_oils_has_its_evidence() {
    for (name, text) in examples() {
        let json = json(&checked(&name, &text, &[]));
        let known: Vec<&str> = json["evidence"]
            .as_array()
            .unwrap()
            .iter()
            .map(|one| one["at"].as_str().unwrap())
            .collect();
        let unique: BTreeSet<&str> = known.iter().copied().collect();
        assert_eq!(unique.len(), known.len(), "{name}: evidence given twice");
        let mut count = 0;
        for (pointer, value) in flat(&json["oils"]) {
            if value.is_number() {
                let pointer = format!("/oils{pointer}");
                assert!(unique.contains(pointer.as_str()), "{name}: no evidence for {pointer}");
                count += 1;
            }
        }
        assert_eq!(count, known.len(), "{name}: evidence for what is not there");
        for one in json["evidence"].as_array().unwrap() {
            for key in ["method", "source", "reach"] {
                assert!(!one[key].as_str().unwrap().is_empty(), "{name}: {one}");
            }
        }
    }
}

#[test]
fn set_reproduces_every_lever() {
    let mut tried = 0;
    for (name, text) in examples() {
        let case = checked(&name, &text, &[]);
        let json = json(&case);
        for lever in json["levers"].as_array().unwrap() {
            let mut file = CaseFile::read(&name, &text);
            for (key, value) in lever["set"].as_object().unwrap() {
                file.set(key, value.as_str().unwrap()).unwrap();
            }
            let changed = file.check().unwrap_or_else(|faults| panic!("{name}: {faults}"));
            let after = report::advice_json(&changed, &advice::advise(&changed));
            let oil = after["oils"]
                .as_array()
                .unwrap()
                .iter()
                .find(|oil| oil["name"] == lever["oil"])
                .unwrap();
            assert_eq!(oil["start_floor_c"], lever["start_floor_c"], "{name}: {lever}");
            assert_eq!(oil["work_floor_c"], lever["work_floor_c"], "{name}: {lever}");
            assert_eq!(oil["heating"]["heater_w"], lever["heater_w"], "{name}: {lever}");
            assert_eq!(oil["verdict"], lever["verdict"], "{name}: {lever}");
            tried += 1;
        }
    }
    assert!(tried > 15, "only {tried} levers in all examples");
}

/// Pointers whose values differ, without those of text that repeats figures.
fn changed(before: &Value, after: &Value) -> BTreeSet<String> {
    let (before, after) = (flat(before), flat(after));
    before
        .keys()
        .chain(after.keys())
        .filter(|key| before.get(*key) != after.get(*key))
        .cloned()
        .collect()
}

const LOADER: &str = include_str!("../examples/skarn-loader.toml");

#[test]
fn the_shift_an_hour_later_moves_the_clock_and_nothing_else() {
    let before = json(&checked("loader", LOADER, &[]));
    let after = json(&checked("loader", LOADER, &[("duty.shift_start", "07:00")]));
    let moved = changed(&before, &after);
    assert!(moved.contains("/choice/switch_on/clock"));
    for pointer in &moved {
        let clock = pointer == "/choice/switch_on/clock"
            || pointer.starts_with("/inputs/")
            || (pointer.starts_with("/procedure/") && pointer.ends_with("/do"))
            // Parked as before, it stands and is held for an hour longer.
            || hold_plan(&before, pointer)
            || pointer == "/choice/timing/hold_kwh"
            || lever_of(&before, pointer, "more-time");
        assert!(clock, "{pointer} moved with the clock");
    }
    let steps = moved.iter().filter(|p| p.starts_with("/procedure/")).count();
    assert_eq!(steps, 1, "{moved:?}");
}

/// A pointer into a plan that holds the tank through the night.
fn hold_plan(json: &Value, pointer: &str) -> bool {
    row_of(pointer, "/plans/").is_some_and(|row| json["plans"][row]["plan"] == "blanket-and-hold")
}

/// A pointer into a lever of an id.
fn lever_of(json: &Value, pointer: &str, id: &str) -> bool {
    row_of(pointer, "/levers/").is_some_and(|row| json["levers"][row]["id"] == id)
}

fn row_of(pointer: &str, section: &str) -> Option<usize> {
    pointer.strip_prefix(section)?.split('/').next()?.parse().ok()
}

#[test]
fn a_bigger_bore_moves_the_inlet_and_what_hangs_on_it() {
    let before = json(&checked("loader", LOADER, &[]));
    let after = json(&checked("loader", LOADER, &[("suction.bore", "63.5 mm")]));
    let moved = changed(&before, &after);
    for oil in 0..3 {
        // Limits 2, 4, 5 are those of the inlet; the others stay.
        for (limit, inlet) in [
            (0, false),
            (1, false),
            (2, true),
            (3, false),
            (4, true),
            (5, true),
            (6, false),
            (7, false),
        ] {
            let pointer = format!("/oils/{oil}/limits/{limit}/temperature_c");
            assert_eq!(moved.contains(&pointer), inlet, "{pointer}");
        }
        assert!(!moved.contains(&format!("/oils/{oil}/viscosity_at_soak/high_mm2_s")));
        assert!(!moved.contains(&format!("/oils/{oil}/soak_c")));
    }
    for pointer in ["/site/minimum_c", "/ask_for/pour_point_max_c", "/ask_for/viscosity_min_mm2_s"]
    {
        assert!(!moved.contains(pointer), "{pointer}");
    }
    assert!(moved.iter().any(|p| p.starts_with("/procedure/") && p.contains("n_one_rpm")));
    assert!(!moved.iter().any(|p| p.starts_with("/cautions/") && p.ends_with("/id")));
}

#[test]
fn five_kelvin_colder_moves_soak_and_heat_and_leaves_the_floors() {
    let sets = [("site.minimum_temperature", "-43 °C"), ("site.heating_temperature", "-39 °C")];
    let before = json(&checked("loader", LOADER, &[]));
    let after = json(&checked("loader", LOADER, &sets));
    let moved = changed(&before, &after);
    for oil in 0..3 {
        for key in ["start_floor_c", "light_floor_c", "work_floor_c", "hot_ceiling_c"] {
            assert!(!moved.contains(&format!("/oils/{oil}/{key}")), "{key} of {oil}");
        }
        assert!(moved.contains(&format!("/oils/{oil}/soak_c")));
    }
    assert!(moved.contains("/oils/2/heating/needed_w"));
    assert!(moved.contains("/ask_for/pour_point_max_c") && moved.contains("/ask_for/at_c"));
    // Under -40 °C the hoses, rated to that, are a stop; they were not before.
    let has = |json: &Value, id: &str| {
        json["cautions"].as_array().unwrap().iter().any(|caution| caution["id"] == id)
    };
    assert!(!has(&before, "hose-rating") && has(&after, "hose-rating"));
    assert!(!has(&before, "lifting-stop") && has(&after, "lifting-stop"));
    // The gate of the cranking step hangs on the floor alone.
    let gate = |json: &Value| {
        json["procedure"]
            .as_array()
            .unwrap()
            .iter()
            .find(|step| step["gate"]["reading"] == "oil-at-suction")
            .map(|step| step["gate"]["at_least_c"].clone())
    };
    assert_eq!(gate(&before), gate(&after));
    assert!(gate(&before).is_some());
}

/// A seeded source of numbers between 0 and 1 (Lehmer 1951, multiplier of Park and Miller 1988).
struct Dice(u64);

impl Dice {
    fn roll(&mut self) -> f64 {
        self.0 = self.0 * 48_271 % 2_147_483_647;
        self.0 as f64 / 2_147_483_647.0
    }

    fn between(&mut self, from: f64, to: f64) -> f64 {
        from + (to - from) * self.roll()
    }

    fn pick<'a>(&mut self, of: &[&'a str]) -> &'a str {
        of[((self.roll() * of.len() as f64) as usize).min(of.len() - 1)]
    }

    fn maybe(&mut self, share: f64) -> bool {
        self.roll() < share
    }
}

/// A random case over what machines, sites and oils there are; any key may be missing.
fn random_case(dice: &mut Dice) -> Option<Case> {
    use std::fmt::Write as _;
    let mut text = String::from("format = 1\n");
    let mut put = |line: String| writeln!(text, "{line}").unwrap();
    let minimum = dice.between(-55.0, 5.0);
    put(format!("site.minimum_temperature = \"{minimum:.1} °C\""));
    if dice.maybe(0.4) {
        let heating = minimum + dice.between(0.0, 8.0);
        put(format!("site.heating_temperature = \"{heating:.1} °C\""));
    }
    put(format!("site.wind = \"{:.1} m/s\"", dice.between(0.0, 12.0)));
    put(format!("site.elevation = \"{:.0} m\"", dice.between(0.0, 4500.0)));
    put(format!("site.clear_sky = {}", dice.maybe(0.3)));
    if dice.maybe(0.5) {
        put(format!("machine.hose_rating = \"{:.0} °C\"", dice.between(-55.0, -20.0)));
    }
    put(format!("machine.pump_heated = {}", dice.maybe(0.1)));
    let kind = dice.pick(&[
        "external-gear",
        "internal-gear",
        "vane",
        "axial-piston",
        "bent-axis",
        "radial-piston",
        "gerotor",
    ]);
    put(format!("pump.kind = \"{kind}\""));
    if dice.maybe(0.8) {
        put(format!(
            "pump.neutral = \"{}\"",
            dice.pick(&["open-centre", "load-sensing", "closed-loop"])
        ));
    }
    if dice.maybe(0.85) {
        put(format!("pump.displacement = \"{:.0} cm³\"", dice.between(8.0, 300.0)));
    }
    put(format!("pump.start_speed = \"{:.0} rpm\"", dice.between(500.0, 1300.0)));
    put(format!("pump.work_speed = \"{:.0} rpm\"", dice.between(1400.0, 3000.0)));
    if dice.maybe(0.8) {
        put(format!("suction.bore = \"{:.0} mm\"", dice.between(15.0, 110.0)));
        put(format!("suction.length = \"{:.2} m\"", dice.between(0.2, 5.0)));
        put(format!("suction.oil_above_pump = \"{:.2} m\"", dice.between(-1.0, 1.5)));
        if dice.maybe(0.3) {
            put("suction.strainer = { loss = \"2.5 kPa\", at_flow = \"100 L/min\", at_viscosity = \"32 mm²/s\" }".to_owned());
        }
    }
    let litres = dice.between(15.0, 900.0);
    put(format!("reservoir.oil_volume = \"{litres:.0} L\""));
    put(format!("reservoir.exposure = \"{}\"", dice.pick(&["enclosed", "open-frame", "exposed"])));
    if dice.maybe(0.4) {
        put(format!("reservoir.insulation.thickness = \"{:.0} mm\"", dice.between(0.0, 60.0)));
    }
    put(format!("duty.time_to_warm = \"{:.1} h\"", dice.between(0.5, 14.0)));
    put(format!("duty.oil_temperature_max = \"{:.0} °C\"", dice.between(30.0, 85.0)));
    if dice.maybe(0.3) {
        put("duty.parked_at = \"18:00\"".to_owned());
        put(format!("duty.parked_oil = \"{:.0} °C\"", dice.between(20.0, 60.0)));
        put(format!("duty.credit_parked_heat = {}", dice.maybe(0.7)));
    }
    put(format!("duty.standing = \"{:.0} h\"", dice.between(8.0, 100.0)));
    put(format!("duty.prefer = \"{}\"", dice.pick(&["oil", "heater"])));
    if dice.maybe(0.1) {
        put("duty.fluid = \"biodegradable\"".to_owned());
    }
    if dice.maybe(0.8) {
        put(format!("supply.voltage = \"{}\"", dice.pick(&["120 V", "230 V", "400 V", "480 V"])));
        put(format!(
            "supply.current = \"{}\"",
            dice.pick(&["10 A", "15 A", "16 A", "20 A", "32 A"])
        ));
        put(format!("supply.phases = {}", dice.pick(&["1", "3"])));
        put(format!("supply.other_load = \"{:.0} W\"", dice.between(0.0, 1000.0)));
    }
    put(format!("element.kind = \"{}\"", dice.pick(&["immersion", "immersion", "pad"])));
    put(format!(
        "element.place = \"{}\"",
        dice.pick(&["below-suction", "below-suction", "above-suction", "circulated"])
    ));
    if dice.maybe(0.2) {
        put(format!("element.power = \"{:.0} W\"", dice.between(200.0, 4000.0)));
        put(format!("element.surface = \"{:.0} cm²\"", dice.between(100.0, 4000.0)));
    }
    for oil in 0..(1.0 + 2.0 * dice.roll()).round() as usize {
        put("[[oil]]".to_owned());
        put(format!("name = \"oil {oil}\""));
        if oil == 0 && dice.maybe(0.7) {
            put("in_service = true".to_owned());
        }
        let base = dice.pick(&[
            "mineral",
            "polymer-thickened",
            "pao",
            "ester",
            "natural-ester",
            "glycol",
            "other",
        ]);
        put(format!("base = \"{base}\""));
        let kv40 = dice.between(10.0, 80.0);
        let index = dice.between(70.0, 200.0);
        put(format!("viscosity = {{ \"40 °C\" = \"{kv40:.2} mm²/s\" }}"));
        put(format!("viscosity_index = {index:.0}"));
        if dice.maybe(0.9) {
            put(format!("pour_point = \"{:.0} °C\"", dice.between(-65.0, -6.0)));
        }
        if dice.maybe(0.5) {
            put(format!("flash_point = \"{:.0} °C\"", dice.between(80.0, 260.0)));
        }
        if dice.maybe(0.3) {
            put(format!("biodegradable = {}", dice.maybe(0.5)));
        }
    }
    CaseFile::read("random", &text).check().ok()
}

/// Invariants 2, 3 and 4 of the design, on one case.
fn on_the_safe_side(case: &Case) {
    let decision = advice::decide(case);
    let policy = &case.policy;
    for (oil, found) in case.oils.iter().zip(&decision.oils) {
        let floor = found.start_floor.at_c;
        if let (Some(floor), Some(pour)) = (floor, oil.pour_point()) {
            assert!(floor >= pour.as_celsius() + policy.limits.pour_margin_k - 1e-6);
        }
        if let Some(floor) = floor {
            let limit = case.pump.viscosity_start_max.as_mm2_per_s();
            assert!(oil.high(floor) <= limit * (1.0 + 1e-5), "{} over {limit}", oil.high(floor));
        }
        let unproven = case.suction.is_none() || case.pump.displacement.is_none();
        assert!(!unproven || found.verdict != Verdict::StartsCold, "an inlet nobody checked");
        let heating = &found.heating;
        if heating.status == HeatingStatus::Sized {
            assert!(!found.gels(), "tank heat counted on where the oil gels in the lines");
            if let (Some(supply), Some(watts)) = (&case.supply, heating.heater_w) {
                let rating = supply.voltage.as_volts()
                    * supply.current.as_amperes()
                    * if supply.three_phase { 3_f64.sqrt() } else { 1.0 };
                let rated = case
                    .element
                    .rated_voltage
                    .map_or(1.0, |v| (supply.voltage.as_volts() / v.as_volts()).powi(2));
                assert!(watts * rated + supply.other_load.as_watts() <= rating * (1.0 + 1e-9));
            }
            if let (Some(used), Some(most)) = (heating.watt_density, heating.watt_density_max) {
                assert!(used <= most * (1.0 + 1e-9), "watt density {used} over {most}");
            }
            if let (Some(skin), Some(flash)) = (heating.skin_bulk_c, oil.flash_point()) {
                assert!(skin <= flash.as_celsius() - policy.heat.flash_margin_k + 0.6, "{skin}");
            }
            assert!(heating.skin_film_c.is_none_or(|skin| skin <= policy.heat.skin_max_c + 0.6));
        }
    }
    for plan in &decision.plans {
        let found = &decision.oils[plan.oil];
        if !plan.allowed {
            continue;
        }
        assert_ne!(found.verdict, Verdict::NotSuited, "{plan:?}");
        let floor = found.start_floor.at_c.expect("an allowed plan has a start floor");
        match plan.kind {
            PlanKind::StartCold | PlanKind::ChangeOil => {
                assert!(found.soak_c >= floor && !found.gels(), "{plan:?}");
            }
            PlanKind::Heat | PlanKind::ChangeAndHeat => {
                assert_eq!(found.heating.status, HeatingStatus::Sized);
                assert!(plan.heater_w.is_some() && plan.ready_s.is_some());
                assert!(found.heating.mean_target_c.unwrap() >= floor);
            }
            PlanKind::BlanketAndHold => assert!(plan.heater_w.is_some() && !found.gels()),
            PlanKind::StartWarmTank => assert!(found.tank_soak_c >= floor && !found.gels()),
            PlanKind::WholeMachineHeat | PlanKind::KeepRunning => {}
        }
    }
    if let Some(chosen) = decision.chosen() {
        assert!(chosen.allowed);
        assert!(!case.oils[chosen.oil].reference_only());
    }
}

#[test]
fn ten_thousand_random_cases_stay_on_the_safe_side() {
    let mut dice = Dice(20_261_201);
    let (mut made, mut choices) = (0, BTreeSet::new());
    while made < 10_000 {
        let Some(case) = random_case(&mut dice) else { continue };
        on_the_safe_side(&case);
        made += 1;
        if made % 10 == 0 {
            choices.insert(advice::decide(&case).chosen().map(|plan| plan.kind.id()));
        }
        if made % 50 == 0 {
            steps_keep_the_gate(&case);
        }
    }
    assert!(choices.len() >= 7, "the cases are too much alike: {choices:?}");
}

/// No step turns the pump before a gate at the start floor or over it, and none at all without a plan.
fn steps_keep_the_gate(case: &Case) {
    let advice = advice::advise(case);
    let chosen = advice.decision.chosen();
    let turning = [Phase::Crank, Phase::FirstTurn, Phase::Circulate, Phase::Functions, Phase::Load];
    let first = advice.procedure.iter().find(|step| turning.contains(&step.phase));
    let Some(plan) = chosen else {
        assert!(first.is_none(), "a step turns the pump without a plan");
        return;
    };
    let floor = advice.decision.oils[plan.oil].start_floor.at_c.unwrap();
    let gate = first.and_then(|step| step.gate).expect("the first of them is a gate");
    assert_eq!(gate.reading, Reading::OilAtSuction);
    assert!(matches!(gate.bound, Bound::AtLeastC(t) if t >= floor), "{gate:?} under {floor}");
    assert!(advice.cautions.iter().any(|caution| caution.row.id == "manual-first"));
    let value = report::advice_json(case, &advice);
    nulls_are_explained("random", "", &value);
    assert!(!value.to_string().contains("NaN"));
    for step in &advice.procedure {
        let text = format!("{:?}", step.text);
        assert!(!text.contains('{') || text.contains("Figure {"), "unfilled: {text}");
    }
}
