//! The example cases: each runs, every limit governs somewhere, every caution shows somewhere and stays
//! away somewhere, and what is printed is what was printed.
#![cfg(feature = "cli")]

use coldsump::advice::{self, LIMITS};
use coldsump::case::{Case, CaseFile};
use coldsump::report;
use std::collections::{BTreeMap, BTreeSet};

#[path = "../examples/bore_sweep.rs"]
mod bore_sweep;
#[path = "../examples/which_oil.rs"]
mod which_oil;

fn cases() -> BTreeMap<String, Case> {
    let mut found = BTreeMap::new();
    for entry in std::fs::read_dir("examples").unwrap() {
        let path = entry.unwrap().path();
        if path.extension().is_some_and(|end| end == "toml") {
            let name = path.file_stem().unwrap().to_string_lossy().into_owned();
            let text = std::fs::read_to_string(&path).unwrap();
            let case = CaseFile::read(&name, &text).check().unwrap_or_else(|f| panic!("{f}"));
            found.insert(name, case);
        }
    }
    assert!(found.len() >= 12);
    found
}

/// (example, oil, start floor set by, light floor set by, work floor set by).
const GOVERNS: &[(&str, usize, &str, &str, &str)] = &[
    ("vane-crusher", 1, "pour-margin", "viscosity-work", "inlet-pressure-work"),
    ("skarn-loader", 2, "viscosity-start", "viscosity-work", "inlet-pressure-work"),
    ("hollow-skid", 0, "inlet-pressure-start", "inlet-pressure-light", "inlet-pressure-work"),
    ("high-excavator", 0, "viscosity-start", "viscosity-work", "viscosity-work"),
    ("mild-grader", 0, "inlet-pressure-start", "inlet-pressure-light", "inlet-pressure-work"),
    (
        "closed-loop-roller",
        0,
        "inlet-pressure-start",
        "inlet-pressure-light",
        "inlet-pressure-work",
    ),
];

#[test]
fn every_limit_governs_somewhere() {
    let cases = cases();
    let mut governs = BTreeSet::new();
    for (name, oil, start, light, work) in GOVERNS {
        let case = &cases[*name];
        let found = advice::assess(case, &case.oils[*oil]);
        let by = |floor: advice::Floor| floor.set_by.unwrap().id();
        assert_eq!(by(found.start_floor), *start, "{name}, start");
        assert_eq!(by(found.light_floor), *light, "{name}, light");
        assert_eq!(by(found.work_floor), *work, "{name}, work");
        governs.extend([*start, *light, *work]);
    }
    // The thin edge ends this oil under its hottest temperature; the lines gel at the soak.
    let crusher = &cases["vane-crusher"];
    let thin = advice::assess(crusher, &crusher.oils[1]);
    if thin.hot_ceiling_c.unwrap() < crusher.duty.oil_temperature_max.as_celsius() {
        governs.insert("viscosity-min");
    }
    let loader = &cases["skarn-loader"];
    if advice::assess(loader, &loader.oils[0]).verdict == advice::Verdict::NeedsWholeMachineHeat {
        governs.insert("line-flow");
    }
    for row in LIMITS {
        assert!(governs.contains(row.id.id()), "{} governs nowhere", row.id.id());
    }
}

/// Plans chosen, so that a change of the choice does not go unseen.
#[test]
fn the_examples_come_to_these_plans() {
    let want = [
        ("bio-forwarder", Some("change-and-heat")),
        ("closed-loop-roller", Some("heat")),
        ("deep-cold-drill", Some("keep-running")),
        ("fitted-heater-crane", Some("heat")),
        ("high-excavator", Some("heat")),
        ("hollow-skid", Some("heat")),
        ("mild-grader", Some("start-cold")),
        ("north-bench-classes", Some("change-and-heat")),
        ("parked-warm-loader", Some("start-warm-tank")),
        ("skarn-loader", Some("change-and-heat")),
        ("tarn-backhoe-us", Some("heat")),
        ("vane-crusher", Some("heat")),
    ];
    let cases = cases();
    for (name, plan) in want {
        let decision = advice::decide(&cases[name]);
        assert_eq!(decision.chosen().map(|plan| plan.kind.id()), plan, "{name}");
    }
    assert_eq!(cases.len(), want.len(), "an example is not listed here");
}

/// A caution, an example, and keys set over it.
type Shows = (&'static str, &'static str, &'static [(&'static str, &'static str)]);

/// Cautions that no example shows, with an edit of an example that does.
const SHOWN_BY: &[Shows] = &[
    ("pour-point-unknown", "mild-grader", &[("oil.pour_point", "none")]),
    ("limit-does-not-fit", "mild-grader", &[("pump.displacement", "120 cm³")]),
    ("index-mismatch", "mild-grader", &[("oil.viscosity_index", "90")]),
    (
        "little-in-hand",
        "mild-grader",
        &[("site.minimum_temperature", "-16 °C"), ("element.place", "above-suction")],
    ),
    ("no-supply", "mild-grader", &[("site.minimum_temperature", "-25 °C")]),
    ("heater-tight", "hollow-skid", &[("supply.heater_sizes", "250 W")]),
    (
        "below-pour-heating",
        "closed-loop-roller",
        &[("oil[1].pour_point", "-27 °C"), ("oil[2].pour_point", "-24 °C")],
    ),
    ("lifting-stop", "mild-grader", &[("site.minimum_temperature", "-45 °C")]),
    ("thin-hot", "mild-grader", &[("duty.oil_temperature_max", "64 °C")]),
];

/// Cautions that are there whatever the case.
const ALWAYS: &[&str] = &[
    "open-flame",
    "fluid-injection",
    "stored-energy",
    "filter-bypass",
    "oils-not-judged",
    "manual-first",
];

/// A mild case that few cautions touch.
const QUIET: &str = r#"
format = 1
site.minimum_temperature = "2 °C"
machine = { engine = "electric", hose_rating = "-40 °C" }
pump = { kind = "axial-piston", neutral = "open-centre", displacement = "20 cm³" }
suction = { bore = "50.8 mm", length = "0.8 m", oil_above_pump = "0.5 m" }
reservoir.oil_volume = "100 L"
duty.time_to_warm = "4 h"
[[oil]]
in_service = true
base = "mineral"
viscosity = { "40 °C" = "32 mm²/s", "100 °C" = "5.6 mm²/s", "-25 °C" = "3600 mm²/s" }
pour_point = "-36 °C"
flash_point = "210 °C"
"#;

#[test]
fn every_caution_shows_somewhere_and_stays_away_somewhere() {
    let mut shown: BTreeMap<String, String> = BTreeMap::new();
    let note = |name: &str, case: &Case, shown: &mut BTreeMap<String, String>| {
        for caution in advice::advise(case).cautions {
            shown.entry(caution.row.id.clone()).or_insert_with(|| name.to_owned());
        }
    };
    for (name, case) in &cases() {
        note(name, case, &mut shown);
    }
    for (id, example, sets) in SHOWN_BY {
        let text = std::fs::read_to_string(format!("examples/{example}.toml")).unwrap();
        let mut file = CaseFile::read(example, &text);
        for (key, value) in *sets {
            file.set(key, value).unwrap();
        }
        let case = file.check().unwrap_or_else(|faults| panic!("{faults}"));
        let advice = advice::advise(&case);
        let ids: Vec<&str> = advice.cautions.iter().map(|c| c.row.id.as_str()).collect();
        assert!(ids.contains(id), "{example} with {sets:?} does not show {id}: {ids:?}");
        note(example, &case, &mut shown);
    }
    let quiet = CaseFile::read("quiet", QUIET).check().unwrap_or_else(|faults| panic!("{faults}"));
    let quiet: Vec<String> =
        advice::advise(&quiet).cautions.iter().map(|caution| caution.row.id.clone()).collect();
    for row in advice::caution_rows() {
        assert!(shown.contains_key(&row.id), "{} shows nowhere", row.id);
        let always = ALWAYS.contains(&row.id.as_str());
        assert_eq!(quiet.contains(&row.id), always, "{} in a quiet case", row.id);
    }
}

#[test]
fn what_is_printed_is_what_was_printed() {
    for (name, case) in &cases() {
        let advice = advice::advise(case);
        let document = report::advice(case, &advice, case.units);
        let text = report::text(&document, report::Look::default());
        for line in text.lines() {
            assert!(line.chars().count() <= 80, "{name}: wider than 80 columns: {line}");
        }
        insta::assert_snapshot!(format!("{name}"), text);
    }
}

#[test]
fn the_markdown_of_the_examples() {
    for (name, case) in &cases() {
        let document = report::advice(case, &advice::advise(case), case.units);
        insta::assert_snapshot!(format!("{name}.md"), report::markdown(&document));
    }
}

#[test]
fn the_library_examples_run() {
    let lines = which_oil::table(include_str!("../examples/skarn-loader.toml")).unwrap();
    assert_eq!(lines.len(), 3);
    assert!(lines[2].starts_with("synthetic: -25.8 °C, needs heat"), "{lines:?}");
    let rows =
        bore_sweep::sweep(include_str!("../examples/hollow-skid.toml"), &[25.4, 31.8, 38.1, 50.8])
            .unwrap();
    let floors: Vec<f64> = rows.iter().map(|(_, floor, _)| floor.unwrap()).collect();
    assert!(floors.windows(2).all(|pair| pair[1] <= pair[0]), "{floors:?}");
}
