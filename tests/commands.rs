//! The program as it is run: output, errors, exit codes.
#![cfg(feature = "cli")]

use std::io::Write;
use std::process::{Command, Output, Stdio};

const LOADER: &str = "examples/skarn-loader.toml";

fn run(args: &[&str]) -> Output {
    with_input(args, "")
}

fn with_input(args: &[&str], input: &str) -> Output {
    let mut child = Command::new(env!("CARGO_BIN_EXE_coldsump"))
        .args(args)
        .env_remove("CLICOLOR_FORCE")
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    // The program may not read it at all.
    let _ = child.stdin.take().unwrap().write_all(input.as_bytes());
    child.wait_with_output().unwrap()
}

fn text(bytes: &[u8]) -> String {
    String::from_utf8(bytes.to_vec()).unwrap()
}

fn json(output: &Output) -> serde_json::Value {
    serde_json::from_slice(&output.stdout).unwrap()
}

#[test]
fn examples_are_answered() {
    for entry in std::fs::read_dir("examples").unwrap() {
        let path = entry.unwrap().path();
        if path.extension().is_some_and(|end| end == "toml") {
            let output = run(&["assess", path.to_str().unwrap()]);
            assert_eq!(output.status.code(), Some(0), "{path:?}: {}", text(&output.stderr));
            assert!(output.stderr.is_empty(), "{path:?}");
            let out = text(&output.stdout);
            for line in out.lines() {
                assert!(line.chars().count() <= 80, "{path:?}: {line}");
            }
            assert!(out.contains("do not turn the pump below"), "{path:?}");
        }
    }
}

#[test]
fn json_keeps_its_contract() {
    let found = json(&run(&["assess", LOADER, "--format", "json"]));
    assert_eq!(found["format"], 1);
    assert_eq!(found["program"]["name"], "coldsump");
    assert_eq!(found["site"]["minimum_c"], -38.0);
    let oil = &found["oils"][2];
    for key in [
        "name",
        "class",
        "in_service",
        "verdict",
        "reasons",
        "viscosity_index",
        "soak_c",
        "tank_soak_c",
        "viscosity_at_soak",
        "start_floor_c",
        "start_floor_set_by",
        "start_floor_expected_c",
        "light_floor_c",
        "light_floor_set_by",
        "work_floor_c",
        "work_floor_set_by",
        "work_floor_expected_c",
        "hot_ceiling_c",
        "viscosity_at_max_low_mm2_s",
        "limits",
        "heating",
        "first_turn",
        "circulation",
    ] {
        assert!(oil.get(key).is_some_and(|value| !value.is_null()), "{key}");
    }
    for key in [
        "status",
        "needed_w",
        "needed_high_w",
        "heater_w",
        "elements_w",
        "time_s",
        "hold_w",
        "energy_kwh",
        "u_value_w_m2_k",
        "steady_c",
        "mean_target_c",
        "thermostat_c",
        "gate_valid_s",
        "watt_density_max_w_cm2",
        "watt_density_w_cm2",
        "surface_cm2",
        "pump_warming",
        "skin_film_c",
        "skin_bulk_c",
        "current_a",
    ] {
        assert!(oil["heating"].get(key).is_some_and(|value| !value.is_null()), "{key}");
    }
    // Six significant figures, from one rounding.
    let digits = |value: &serde_json::Value| {
        value.to_string().trim_start_matches(['-', '0', '.']).replace('.', "").len()
    };
    assert!(digits(&oil["start_floor_c"]) <= 6, "{}", oil["start_floor_c"]);
    no_null_without_why(&found, "");
}

/// An object with a null carries a `why` that names it.
fn no_null_without_why(value: &serde_json::Value, at: &str) {
    match value {
        serde_json::Value::Object(map) => {
            for (key, inner) in map {
                if inner.is_null() {
                    let why = map.get("why").and_then(|why| why.as_str()).unwrap_or_default();
                    assert!(why.contains(key), "{at}/{key}: {why}");
                }
                no_null_without_why(inner, &format!("{at}/{key}"));
            }
        }
        serde_json::Value::Array(list) => {
            for (index, inner) in list.iter().enumerate() {
                no_null_without_why(inner, &format!("{at}/{index}"));
            }
        }
        _ => {}
    }
}

#[test]
fn figures_on_screen_are_in_the_json() {
    use coldsump::{
        advice,
        case::{CaseFile, Units},
        report,
    };
    for entry in std::fs::read_dir("examples").unwrap() {
        let path = entry.unwrap().path();
        let Some(name) = path.to_str().filter(|name| name.ends_with(".toml")) else { continue };
        let case = CaseFile::read(name, &std::fs::read_to_string(name).unwrap()).check().unwrap();
        let oils: Vec<_> = case.oils.iter().map(|oil| (oil, advice::assess(&case, oil))).collect();
        let json = report::assessment_json(&case, &oils);
        let document = report::assessment(&case, &oils, Units::Metric);
        let mut count = 0;
        for pointer in document.pointers() {
            assert!(
                json.pointer(pointer).is_some_and(|value| !value.is_null()),
                "{name}: {pointer}"
            );
            count += 1;
        }
        assert!(count > 40, "{name}: {count} figures");
    }
}

#[test]
fn several_cases_and_standard_input() {
    let output = run(&["assess", LOADER, "examples/hollow-skid.toml", "--format", "json"]);
    let out = text(&output.stdout);
    let lines: Vec<&str> = out.lines().collect();
    assert_eq!(lines.len(), 2, "one line of JSON a case");
    assert!(lines[0].contains("Loader 12") && lines[1].contains("Skid loader 3"));

    let case = std::fs::read_to_string(LOADER).unwrap();
    let output = with_input(&["assess", "-", "--format", "json"], &case);
    assert_eq!(json(&output)["title"], "Loader 12, Skarn Ridge quarry");
}

#[test]
fn a_bad_case_does_not_stop_the_good_ones() {
    let output = run(&["assess", "examples/none.toml", LOADER]);
    assert_eq!(output.status.code(), Some(1));
    assert!(text(&output.stderr).starts_with("coldsump: cannot read examples/none.toml"));
    assert!(text(&output.stdout).contains("Loader 12"));

    let output = with_input(&["assess", "-", LOADER], "format = 1\n");
    assert_eq!(output.status.code(), Some(2));
    assert!(text(&output.stderr).contains("standard input: pump.kind: is missing"));
    assert!(text(&output.stdout).contains("Loader 12"));
}

#[test]
fn set_and_oil() {
    let output = run(&[
        "assess",
        LOADER,
        "--format",
        "json",
        "--oil",
        "synthetic",
        "--set",
        "site.minimum_temperature=-20 °C",
        "--set",
        "site.heating_temperature=none",
    ]);
    let found = json(&output);
    assert_eq!(found["oils"].as_array().unwrap().len(), 1);
    assert_eq!(found["oils"][0]["verdict"], "starts-cold");
    for (args, want) in [
        (
            vec!["assess", LOADER, "--set", "suction.boar=2 in"],
            "--set: suction.boar: unknown key; did you mean `suction.bore`?",
        ),
        (vec!["assess", LOADER, "--set", "suction.bore"], "--set: `suction.bore` has no `=`"),
        (
            vec!["assess", LOADER, "--oil", "nobody"],
            "examples/skarn-loader.toml: no oil of that name",
        ),
        (vec!["oil", "HM-47", "--at", "0 °C"], "no class `HM-47` is built in"),
        (vec!["oil", "HM-46", "--at", "-40..100"], "--at: `100` has no unit"),
        (vec!["oil", "HM-46", "--at", "100..-40 °C"], "--at: `100..-40 °C` runs downwards"),
        (
            vec!["oil", "--viscosity", "40 °C=46", "--at", "0 °C"],
            "--viscosity.40 °C: `46` has no unit",
        ),
        (vec!["assess"], "error: the following required arguments"),
        (vec!["asess", LOADER], "error: unrecognized subcommand"),
    ] {
        let output = run(&args);
        assert_eq!(output.status.code(), Some(2), "{args:?}");
        assert!(text(&output.stderr).contains(want), "{args:?}: {}", text(&output.stderr));
        assert!(output.stdout.is_empty(), "{args:?}");
    }
}

#[test]
fn one_oil_over_temperature() {
    let found = json(&run(&["oil", "HM-46", "--at", "-40..100 °C by 10", "--format", "json"]));
    let points = found["points"].as_array().unwrap();
    assert_eq!(points.len(), 15);
    assert_eq!(points[0]["reach"], "below-pour");
    assert!(points[0]["high_mm2_s"].is_null());
    no_null_without_why(&found, "");
    assert_eq!(points[8]["temperature_c"], 40.0);
    assert_eq!(points[8]["expected_mm2_s"], 46.0);
    assert_eq!(found["viscosity_index_reported"], 80.0);

    let csv = text(&run(&["oil", "HM-46", "--at", "-40..100 °C by 10", "--format", "csv"]).stdout);
    assert_eq!(csv.lines().count(), 16);
    assert!(csv.starts_with("name,temperature_c,low_mm2_s,expected_mm2_s,high_mm2_s"));

    let fahrenheit = json(&run(&[
        "oil",
        "--viscosity",
        "100 °F=150 SUS",
        "--viscosity",
        "210 °F=44 SUS",
        "--base",
        "mineral",
        "--pour-point",
        "-20 °F",
        "--density",
        "54.6 lb/ft³",
        "--at",
        "-20..100 °F by 20",
        "--format",
        "json",
    ]));
    assert_eq!(fahrenheit["points"].as_array().unwrap().len(), 7);
    let at_100 = &fahrenheit["points"][6];
    assert!(at_100["saybolt_s"].as_f64().is_some_and(|sus| (sus - 150.0).abs() < 1e-3), "{at_100}");

    let out = text(&run(&["oil", "HM 46", "--at", "-10..40 °C by 25", "--ascii"]).stdout);
    assert!(out.is_ascii(), "{out}");
}

#[test]
fn without_a_command_and_for_help() {
    let output = run(&[]);
    assert_eq!(output.status.code(), Some(2));
    assert!(text(&output.stderr).contains("try: coldsump advise CASE.toml"));
    let output = run(&["--help"]);
    assert_eq!(output.status.code(), Some(0));
    assert!(text(&output.stdout).contains("Exit codes"));
}

#[test]
fn colour_only_where_asked() {
    let plain = run(&["assess", LOADER]);
    assert!(!plain.stdout.contains(&0x1b));
    let colored = run(&["assess", LOADER, "--color", "always"]);
    assert!(colored.stdout.contains(&0x1b));
}

#[test]
fn advise_in_every_format() {
    let json = run(&["advise", LOADER, "--format", "json"]);
    assert_eq!(json.status.code(), Some(0));
    let value: serde_json::Value = serde_json::from_slice(&json.stdout).unwrap();
    assert_eq!(value["plans"][value["choice"]["plan"].as_u64().unwrap() as usize]["allowed"], true);
    // Units are of the screen, not of the contract.
    let us = run(&["advise", LOADER, "--format", "json", "--units", "us"]);
    assert_eq!(us.stdout, json.stdout);
    let out = text(&run(&["advise", LOADER, "--units", "us"]).stdout);
    assert!(out.contains("-36.4 °F, heater sized for -29.2 °F"), "{out}");
    let out = text(&run(&["advise", LOADER, "--format", "markdown"]).stdout);
    assert!(out.starts_with("# Loader 12") && out.contains("\n## Procedure\n"), "{out}");
    let out = text(&run(&["advise", LOADER, "--ascii"]).stdout);
    assert!(out.is_ascii(), "{out}");
    let two =
        text(&run(&["advise", LOADER, "examples/hollow-skid.toml", "--format", "json"]).stdout);
    assert_eq!(two.lines().count(), 2);
}

#[test]
fn advise_ends_with_3_where_no_plan_starts_the_machine() {
    let output = run(&["advise", "examples/deep-cold-drill.toml"]);
    assert_eq!(output.status.code(), Some(3));
    assert!(text(&output.stdout).contains("Do not switch it off"));
    let output = run(&["advise", LOADER, "--oil", "oil in service"]);
    assert_eq!(output.status.code(), Some(3));
    // Wrong input is graver than no plan; the good case is still answered.
    let output = run(&["advise", "examples/deep-cold-drill.toml", "README.md"]);
    assert_eq!(output.status.code(), Some(2));
    assert!(text(&output.stdout).contains("Far Adit"));
}

#[test]
fn advise_for_some_oils_only() {
    let out = run(&["advise", LOADER, "--oil", "synthetic", "--format", "json"]);
    let value: serde_json::Value = serde_json::from_slice(&out.stdout).unwrap();
    assert_eq!(value["oils"].as_array().unwrap().len(), 1);
    assert_eq!(value["choice"]["oil"], "synthetic");
    let classes = "examples/north-bench-classes.toml";
    let out = run(&["advise", classes, "--oil", "HV-22", "--oil", "HS-22", "--format", "json"]);
    let value: serde_json::Value = serde_json::from_slice(&out.stdout).unwrap();
    assert_eq!(value["oils"].as_array().unwrap().len(), 2);
    let out = run(&["advise", LOADER, "--oil", "syntetic"]);
    assert_eq!(out.status.code(), Some(2));
    assert_eq!(
        text(&out.stderr),
        "examples/skarn-loader.toml: no oil of the name \"syntetic\"\n\ntry: --oil \"oil in service\" or \"winter multigrade\" or \"synthetic\"\n"
    );
}

#[test]
fn advise_writes_a_file_whole_or_not_at_all() {
    let folder = std::env::temp_dir().join(format!("coldsump-advise-{}", std::process::id()));
    std::fs::create_dir_all(&folder).unwrap();
    let path = folder.join("loader.md");
    let target = path.to_str().unwrap();
    let output = run(&["advise", LOADER, "--format", "markdown", "-o", target]);
    assert_eq!(output.status.code(), Some(0));
    assert!(output.stdout.is_empty());
    let first = std::fs::read_to_string(&path).unwrap();
    assert!(first.starts_with("# Loader 12"));
    let again = run(&["advise", "examples/hollow-skid.toml", "--format", "markdown", "-o", target]);
    assert_eq!(again.status.code(), Some(1));
    assert!(
        text(&again.stderr).contains("is there already\n\ntry: --force"),
        "{}",
        text(&again.stderr)
    );
    assert_eq!(std::fs::read_to_string(&path).unwrap(), first);
    let forced = run(&[
        "advise",
        "examples/hollow-skid.toml",
        "--format",
        "markdown",
        "-o",
        target,
        "--force",
    ]);
    assert_eq!(forced.status.code(), Some(0));
    assert!(std::fs::read_to_string(&path).unwrap().starts_with("# Skid loader 3"));
    let nowhere = folder.join("missing").join("x.md");
    let output = run(&["advise", LOADER, "-o", nowhere.to_str().unwrap()]);
    assert_eq!(output.status.code(), Some(1));
    assert!(text(&output.stderr).contains("cannot write"));
    assert_eq!(std::fs::read_dir(&folder).unwrap().count(), 1, "something half-written stayed");
    std::fs::remove_dir_all(&folder).unwrap();
}

#[test]
fn text_of_a_case_brings_no_terminal_escapes() {
    let case = "format = 1\ntitle = \"a\\u001b[31mb\\u0007\"\nsite.minimum_temperature = \"-9 °C\"\n\
        pump.kind = \"vane\"\nreservoir.oil_volume = \"90 L\"\nduty.time_to_warm = \"2 h\"\n\
        oil = [{ name = \"x\\u001b]0;y\\u0007\", class = \"HV 32\" }]\n";
    for format in ["text", "markdown"] {
        let folder =
            std::env::temp_dir().join(format!("coldsump-esc-{format}-{}", std::process::id()));
        std::fs::write(&folder, case).unwrap();
        let output = run(&["advise", folder.to_str().unwrap(), "--format", format]);
        std::fs::remove_file(&folder).unwrap();
        assert!(!output.stdout.contains(&0x1b) && !output.stdout.contains(&7), "{format}");
        assert!(text(&output.stdout).contains("31mb"));
    }
}

#[test]
fn climates_are_listed_shown_and_made() {
    let out = text(&run(&["climate", "list"]).stdout);
    for name in ["C0", "C4", "valdez-coast", "northway-interior", "skarn-ridge"] {
        assert!(out.contains(name), "{out}");
    }
    let out = text(&run(&["climate", "show", "C2"]).stdout);
    assert!(out.contains("06:00 -46.0 °C") && out.contains("AR 70-38"), "{out}");
    let shown = run(&["climate", "show", "valdez-coast", "--case", "examples/mild-grader.toml"]);
    let out = text(&shown.stdout);
    assert!(out.contains("Winter minima against chance") && out.contains("minimum"), "{out}");
    let missing = run(&["climate", "show", "nowhere"]);
    assert_eq!(missing.status.code(), Some(2));
    assert_eq!(
        text(&missing.stderr),
        "no climate `nowhere` is at hand\n\ntry: coldsump climate list\n"
    );

    let folder = std::env::temp_dir().join(format!("coldsump-climate-{}", std::process::id()));
    std::fs::create_dir_all(&folder).unwrap();
    let target = folder.join("valdez.toml");
    let record = "tests/climate/valdez_wso_tmin_daily_1941_1970.csv";
    let made = run(&["climate", "from", record, "-o", target.to_str().unwrap()]);
    assert_eq!(made.status.code(), Some(0), "{}", text(&made.stderr));
    assert!(made.stdout.is_empty());
    let said = text(&made.stderr);
    assert!(said.contains("read as CSV with date and tmin"), "{said}");
    assert!(said.contains("10176 temperatures used") && said.contains("mind: "), "{said}");
    // A case beside the folder names the file.
    let climate = format!("site.climate={}", target.display());
    let advised = run(&[
        "advise",
        LOADER,
        "--set",
        &climate,
        "--set",
        "site.minimum_temperature=once in 20 winters",
        "--set",
        "site.heating_temperature=none",
        "--format",
        "json",
    ]);
    let value = json(&advised);
    assert_eq!(value["site"]["minimum_how"], "return-level");
    assert_eq!(value["site"]["minimum_c"], -31.31);
    assert_eq!(value["site"]["heating_how"], "percentile");
    let chance = value["cold"]["chance_a_winter"].as_f64().unwrap();
    assert!((chance - 0.05).abs() < 1e-4, "{chance}");
    assert_eq!(value["cold"]["against"].as_array().unwrap().len(), 8);
    // Damaged: one message, nothing written.
    let broken = folder.join("broken.csv");
    std::fs::write(&broken, "date,tmin_c\n2020-01-02,-5\n2020-01-01,-6\n").unwrap();
    let other = folder.join("other.toml");
    let made = run(&["climate", "from", broken.to_str().unwrap(), "-o", other.to_str().unwrap()]);
    assert_eq!(made.status.code(), Some(2));
    assert!(text(&made.stderr).contains("sort the file by date"));
    assert!(!other.exists());
    std::fs::remove_dir_all(&folder).unwrap();
}

#[test]
fn two_cases_are_compared() {
    let folder = std::env::temp_dir().join(format!("coldsump-compare-{}", std::process::id()));
    std::fs::create_dir_all(&folder).unwrap();
    let other = folder.join("other.toml");
    let text_of = std::fs::read_to_string(LOADER).unwrap();
    std::fs::write(&other, text_of.replace("bore = \"50.8 mm\"", "bore = \"63.5 mm\"")).unwrap();
    let out = text(&run(&["compare", LOADER, other.to_str().unwrap()]).stdout);
    assert!(out.contains("suction.bore") && out.contains("63.5 mm"), "{out}");
    assert!(out.contains("synthetic: full from") && out.contains("-11.0 °C"), "{out}");
    assert!(!out.contains("synthetic: turn from"), "{out}");
    let out = text(&run(&["compare", LOADER, LOADER]).stdout);
    assert_eq!(out.matches("Nothing.").count(), 2, "{out}");
    std::fs::remove_dir_all(&folder).unwrap();
}

#[test]
fn schemas_and_completions() {
    let schema = json(&run(&["schema", "case"]));
    let validator = jsonschema::draft7::new(&schema).unwrap();
    for entry in std::fs::read_dir("examples").unwrap() {
        let path = entry.unwrap().path();
        if path.extension().is_none_or(|end| end != "toml") {
            continue;
        }
        let table: toml::Table = toml::from_str(&std::fs::read_to_string(&path).unwrap()).unwrap();
        let value = serde_json::to_value(&table).unwrap();
        let errors: Vec<String> =
            validator.iter_errors(&value).map(|e| format!("{}: {e}", e.instance_path())).collect();
        assert!(errors.is_empty(), "{}: {errors:?}", path.display());
    }
    let wrong = serde_json::json!({ "format": 1, "pump": { "knd": "vane" } });
    assert!(!validator.is_valid(&wrong));
    let advice = text(&run(&["schema"]).stdout);
    assert_eq!(advice, std::fs::read_to_string("src/report/advice.schema.json").unwrap());
    for shell in ["bash", "zsh", "fish", "powershell"] {
        let output = run(&["completions", shell]);
        assert_eq!(output.status.code(), Some(0));
        assert!(text(&output.stdout).contains("interview"), "{shell}");
    }
}
