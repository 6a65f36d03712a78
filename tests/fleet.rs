//! Many machines: order, equality with a machine's own advice, stock against brute force, the yard
//! against exhaustive search, damaged files, broken runs.
#![cfg(feature = "cli")]

use coldsump::advice;
use coldsump::case::CaseFile;
use coldsump::fleet::{Job, Machine, OilChoice, Rows, stock, yard};
use std::collections::BTreeSet;
use std::path::{Path, PathBuf};
use std::process::{Command, Output};

const FLEET: &str = "examples/skarn-fleet.csv";

fn run(args: &[&str], threads: &str) -> Output {
    Command::new(env!("CARGO_BIN_EXE_coldsump"))
        .args(args)
        .env("RAYON_NUM_THREADS", threads)
        .output()
        .unwrap()
}

fn text(bytes: &[u8]) -> String {
    String::from_utf8(bytes.to_vec()).unwrap()
}

fn folder(name: &str) -> PathBuf {
    let folder = std::env::temp_dir().join(format!("coldsump-fleet-{name}-{}", std::process::id()));
    let _ = std::fs::remove_dir_all(&folder);
    std::fs::create_dir_all(&folder).unwrap();
    folder
}

#[test]
fn rows_come_out_in_order_whatever_the_threads() {
    for format in ["csv", "jsonl"] {
        let one = run(&["fleet", FLEET, "--format", format], "1");
        let four = run(&["fleet", FLEET, "--format", format], "4");
        assert_eq!(one.stdout, four.stdout, "{format}");
        // Some machines start by no plan.
        assert_eq!(one.status.code(), Some(3));
    }
    let csv = text(&run(&["fleet", FLEET, "--format", "csv"], "2").stdout);
    let names: Vec<&str> =
        csv.lines().skip(1).map(|line| line.split('"').nth(1).unwrap()).collect();
    let file = std::fs::read_to_string(FLEET).unwrap();
    let wanted: Vec<&str> =
        file.lines().skip(1).map(|line| line.split('"').nth(1).unwrap()).collect();
    assert_eq!(names, wanted);
}

#[test]
fn a_row_is_what_its_own_case_gives() {
    let lines = text(&run(&["fleet", FLEET, "--format", "jsonl"], "2").stdout);
    let file = std::fs::File::open(FLEET).unwrap();
    let mut compared = 0;
    for (row, line) in Rows::open(file).unwrap().zip(lines.lines()) {
        let row = row.unwrap();
        let base = format!("examples/{}", row.base.as_ref().unwrap());
        let base = CaseFile::read(&base, &std::fs::read_to_string(&base).unwrap());
        let case = row.case_file(Some(&base), &[]).unwrap().check().unwrap();
        let mut own = coldsump::report::advice_json(&case, &advice::advise(&case));
        let mut here: serde_json::Value = serde_json::from_str(line).unwrap();
        assert_eq!(here["machine"], row.machine);
        for key in ["machine", "count"] {
            here.as_object_mut().unwrap().remove(key);
        }
        own.as_object_mut().unwrap().remove("machine");
        assert_eq!(here, own, "{}", row.machine);
        compared += 1;
    }
    assert_eq!(compared, 42);
}

/// The lines of one machine, three ways.
#[test]
fn csv_toml_and_json_lines_are_one() {
    let folder = folder("forms");
    let base = std::fs::canonicalize("examples/hollow-skid.toml").unwrap();
    let base = base.display();
    let forms = [
        (
            "a.csv",
            format!("machine;count;base;site.minimum_temperature\nSkid 1;2;{base};-31,5 °C\n"),
        ),
        (
            "b.toml",
            format!(
                "[[machine]]\nname = \"Skid 1\"\ncount = 2\nbase = \"{base}\"\nsite.minimum_temperature = \"-31,5 °C\"\n"
            ),
        ),
        (
            "c.jsonl",
            format!(
                "{{\"machine\": \"Skid 1\", \"count\": 2, \"base\": \"{base}\", \"site.minimum_temperature\": \"-31,5 °C\"}}\n"
            ),
        ),
    ];
    let mut last: Option<String> = None;
    for (name, content) in forms {
        let path = folder.join(name);
        std::fs::write(&path, content).unwrap();
        let output = run(&["fleet", path.to_str().unwrap(), "--format", "csv"], "2");
        assert_eq!(output.status.code(), Some(0), "{name}: {}", text(&output.stderr));
        let out = text(&output.stdout);
        assert!(out.contains("Skid 1,2,HV 32,needs-heat"), "{name}: {out}");
        assert!(last.as_ref().is_none_or(|last| *last == out), "{name}");
        last = Some(out);
    }
    std::fs::remove_dir_all(&folder).unwrap();
}

#[test]
fn bad_rows_are_told_and_stop_nothing() {
    let folder = folder("bad");
    let path = folder.join("fleet.csv");
    let base = std::fs::canonicalize("examples/hollow-skid.toml").unwrap();
    let base = base.display();
    std::fs::write(
        &path,
        format!(
            "\u{feff}machine,base,site.minimum_temperature\r\ngood,{base},-25 °C\r\nbad,{base},-25\r\n,{base},-25 °C\r\nlost,nowhere.toml,-25 °C\r\nlong,{base},-25 °C,more\r\nagain,{base},-20 °C\r\n"
        ),
    )
    .unwrap();
    let output = run(&["fleet", path.to_str().unwrap(), "--format", "csv"], "2");
    assert_eq!(output.status.code(), Some(2));
    let out = text(&output.stdout);
    assert_eq!(out.lines().count(), 7, "{out}");
    assert!(out.contains("\ngood,1,HV 32") && out.contains("\nagain,1,HV 32"), "{out}");
    let said = text(&output.stderr);
    for want in [
        "fleet.csv:3: site.minimum_temperature: `-25` has no unit; write for example `-25 °C`",
        "fleet.csv:4: machine: is missing",
        "fleet.csv:5: base: cannot read nowhere.toml",
        "fleet.csv:6: has 4 fields, the header 3",
    ] {
        assert!(said.contains(want), "{want}\n{said}");
    }
    for (content, want) in [
        ("machine,pump.knd\nx,vane\n", "1: column `pump.knd` is no key; did you mean `pump.kind`?"),
        ("name,pump.kind\nx,vane\n", "1: column `name` is no key"),
        ("pump.kind\nvane\n", "1: has no column `machine`"),
        ("[[machine]]\nname = 3 4\n", "2: "),
        ("{\"machine\": [1]}\n", "1: machine: takes text or a number"),
        ("{\"machine\": \n", "1: is no JSON object"),
    ] {
        std::fs::write(&path, content).unwrap();
        let output = run(&["fleet", path.to_str().unwrap(), "--format", "csv"], "2");
        assert_eq!(output.status.code(), Some(2), "{content}");
        assert!(
            text(&output.stderr).contains(&format!("fleet.csv:{want}")),
            "{content}: {}",
            text(&output.stderr)
        );
    }
    std::fs::remove_dir_all(&folder).unwrap();
}

#[test]
fn a_broken_run_goes_on_byte_for_byte() {
    let folder = folder("resume");
    for format in ["csv", "jsonl"] {
        let whole = folder.join(format!("whole.{format}"));
        run(&["fleet", FLEET, "--format", format, "-o", whole.to_str().unwrap()], "2");
        let bytes = std::fs::read(&whole).unwrap();
        for cut in [0, 1, bytes.len() / 3, bytes.len() / 2, bytes.len() - 1, bytes.len()] {
            let part = folder.join("part");
            std::fs::write(&part, &bytes[..cut]).unwrap();
            let target = part.to_str().unwrap();
            let refused = run(&["fleet", FLEET, "--format", format, "-o", target], "2");
            assert_eq!(refused.status.code(), Some(2));
            assert!(text(&refused.stderr).contains("--resume"));
            run(&["fleet", FLEET, "--format", format, "-o", target, "--resume"], "2");
            assert!(std::fs::read(&part).unwrap() == bytes, "{format}, cut at {cut}");
        }
    }
    std::fs::remove_dir_all(&folder).unwrap();
}

#[test]
fn the_summary_the_sweep_and_the_cards() {
    let out = text(&run(&["fleet", FLEET, "--yard-power", "40 kW"], "2").stdout);
    for want in [
        "61 in 42 rows",
        "Oils to stock",
        "is the least there is",
        "Heaters to fit",
        "The yard's supply",
    ] {
        assert!(out.contains(want), "{want}\n{out}");
    }
    assert!(out.lines().all(|line| line.chars().count() <= 80));
    let sweep = run(
        &[
            "fleet",
            FLEET,
            "--sweep",
            "site.minimum_temperature=-10..-40 °C by 15",
            "--set",
            "site.heating_temperature=none",
        ],
        "2",
    );
    let out = text(&sweep.stdout);
    assert!(out.contains("-25 °C") && out.contains("61 of 61"), "{out}");
    let wrong = run(&["fleet", FLEET, "--sweep", "site.minimum_temperature=-10"], "2");
    assert_eq!(wrong.status.code(), Some(2));
    assert!(text(&wrong.stderr).contains("write for example"));
    let folder = folder("cards");
    run(&["fleet", FLEET, "--format", "csv", "--card", folder.to_str().unwrap()], "2");
    assert_eq!(std::fs::read_dir(&folder).unwrap().count(), 42);
    std::fs::remove_dir_all(&folder).unwrap();
}

/// A seeded source of numbers (Lehmer 1951, multiplier of Park and Miller 1988).
struct Dice(u64);

impl Dice {
    fn below(&mut self, n: u64) -> u64 {
        self.0 = self.0 * 48_271 % 2_147_483_647;
        self.0 % n
    }
}

fn example_machine() -> Machine {
    let text = std::fs::read_to_string("examples/mild-grader.toml").unwrap();
    Machine::decide("x", 1, &CaseFile::read("x", &text).check().unwrap())
}

#[test]
fn the_stock_is_the_least_that_brute_force_finds() {
    let template = example_machine();
    let mut dice = Dice(4711);
    for round in 0..300 {
        let oils = 2 + dice.below(9);
        let machines: Vec<Machine> = (0..3 + dice.below(12))
            .map(|at| {
                let mask = dice.below(1 << oils);
                Machine {
                    name: format!("m{at}"),
                    oils: (0..oils)
                        .filter(|oil| mask & (1 << oil) != 0)
                        .map(|oil| OilChoice {
                            oil: format!("o{oil:02}"),
                            energy_kwh: dice.below(50) as f64 / 10.0,
                        })
                        .collect(),
                    ..template.clone()
                }
            })
            .collect();
        let found = stock(&machines);
        let least = (0_u64..1 << oils)
            .filter(|set| {
                machines.iter().filter(|m| !m.oils.is_empty()).all(|m| {
                    m.oils.iter().any(|c| {
                        let at: u64 = c.oil[1..].parse().unwrap();
                        set & (1 << at) != 0
                    })
                })
            })
            .map(u64::count_ones)
            .min()
            .unwrap();
        assert_eq!(found.oils.len(), least as usize, "round {round}: {found:?}");
        assert!(found.proven && found.lower_bound <= found.oils.len());
        let named: BTreeSet<&String> = found.oils.iter().map(|(oil, _)| oil).collect();
        for machine in machines.iter().filter(|m| !m.oils.is_empty()) {
            assert!(
                machine.oils.iter().any(|c| named.contains(&c.oil)),
                "{} is left out",
                machine.name
            );
        }
        // The machines of the bound share no oil.
        let apart: Vec<&Machine> =
            machines.iter().filter(|m| found.apart.contains(&m.name)).collect();
        let all: Vec<&String> = apart.iter().flat_map(|m| m.oils.iter().map(|c| &c.oil)).collect();
        let distinct: BTreeSet<&&String> = all.iter().collect();
        assert_eq!(all.len(), distinct.len());
    }
}

/// The least peak of all plans, by trying them all.
fn exhaustive(jobs: &[Job], load: &mut Vec<f64>, best: &mut f64) {
    let Some((job, rest)) = jobs.split_first() else {
        *best = best.min(load.iter().copied().fold(0.0, f64::max));
        return;
    };
    for on in 0..=job.ready - job.slots {
        let before = load.clone();
        for (at, load) in load.iter_mut().enumerate().take(job.ready).skip(on) {
            *load += if at < on + job.slots { job.heater_w } else { job.hold_w };
        }
        exhaustive(rest, load, best);
        *load = before;
    }
}

#[test]
fn the_yard_is_near_the_least_peak_and_never_under_its_bound() {
    let mut dice = Dice(99);
    let (mut met, rounds) = (0, 150);
    for round in 0..rounds {
        let jobs: Vec<Job> = (0..2 + dice.below(3))
            .map(|at| {
                let ready = 4 + dice.below(6) as usize;
                Job {
                    machine: format!("m{at}"),
                    heater_w: 250.0 * (1 + dice.below(8)) as f64,
                    hold_w: 25.0 * dice.below(4) as f64,
                    slots: 1 + dice.below(ready as u64 - 1) as usize,
                    ready,
                }
            })
            .collect();
        let plan = yard(&jobs, f64::INFINITY);
        let mut least = f64::INFINITY;
        let end = jobs.iter().map(|job| job.ready).max().unwrap();
        exhaustive(&jobs, &mut vec![0.0; end], &mut least);
        assert!(plan.bound_w <= least + 1e-6, "round {round}: bound {} over {least}", plan.bound_w);
        assert!(plan.peak_w >= least - 1e-6 && plan.peak_w <= plan.last_minute_w + 1e-6);
        met += u32::from(plan.peak_w <= least + 1e-6);
        for slot in &plan.slots {
            let job = &jobs[slot.job];
            assert!(slot.on + job.slots <= job.ready, "not ready in time");
        }
        // Under a limit nothing runs over it, and who is late is named.
        let tight = yard(&jobs, least * 0.8);
        assert!(tight.peak_w <= least * 0.8 + 1e-6);
        assert!(!tight.late.is_empty());
        assert_eq!(tight.slots.len() + tight.late.len(), jobs.len());
    }
    assert_eq!(met, rounds, "small yards are searched through");
}

#[test]
fn text_that_a_spreadsheet_would_run_stays_text() {
    let folder = folder("formula");
    let path = folder.join("fleet.csv");
    let base = std::fs::canonicalize("examples/hollow-skid.toml").unwrap();
    std::fs::write(&path, format!("machine,base\n\"=cmd|'/c calc'!A1\",{}\n", base.display()))
        .unwrap();
    let out = text(&run(&["fleet", path.to_str().unwrap(), "--format", "csv"], "1").stdout);
    assert!(out.lines().nth(1).unwrap().starts_with("'=cmd"), "{out}");
    std::fs::remove_dir_all(Path::new(&folder)).unwrap();
}
