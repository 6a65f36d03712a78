//! The interview: whole runs from scripts, and the built program in a pseudo-terminal.
#![cfg(all(feature = "cli", unix))]

use coldsump::advice;
use coldsump::case::CaseFile;
use coldsump::climate::BuiltIn;
use coldsump::interview::{Ask, Draft, Length, Prompt, Reply, Script, Stop, interview};
use std::collections::VecDeque;
use std::io::{Read, Write};
use std::process::{Child, Command, Stdio};
use std::sync::mpsc::{Receiver, channel};
use std::time::{Duration, Instant};

const QUICK: &[(&str, &str)] = &[
    ("site.minimum_temperature", "−30,5 °C"),
    ("pump.kind", "axial-piston"),
    ("pump.neutral", "load-sensing"),
    ("pump.displacement", "?"),
    ("hose.outside", "61 mm"),
    ("suction.length", "5 ft"),
    ("hose.bends", "two"),
    ("reservoir.oil_volume", "50 gal"),
    ("duty.time_to_warm", "4 h"),
    ("duty.shift_start", "06:30"),
    ("oil1.how", "sheet"),
    ("oil1.viscosity.40 °C", "32 cSt"),
    ("oil1.viscosity.100 °C", "none"),
    ("oil1.viscosity_index", "150"),
    ("oil1.cold_viscosity", "-20 °C = 1300 mPa·s"),
    ("oil1.pour_point", "-39C"),
    ("supply.voltage", "230 V"),
    ("supply.current", "16 A"),
];

fn base() -> CaseFile {
    CaseFile::read("case", "format = 1\n")
}

fn run(ask: &mut dyn Ask, draft: &mut Draft, length: Length) -> Result<CaseFile, Stop> {
    interview(ask, &base(), draft, length, &BuiltIn, &mut |_| Ok(()))
}

#[test]
fn a_quick_run_makes_the_case() {
    let mut script = Script::new("script", QUICK);
    let file = run(&mut script, &mut Draft::new(), Length::Quick).unwrap();
    assert_eq!(
        file.write(),
        r#"format = 1
units = "metric"

[site]
minimum_temperature = "−30,5 °C"

[pump]
kind = "axial-piston"
neutral = "load-sensing"

[suction]
bore = "50.8 mm"
length = "5 ft"
fittings = { "elbow-90-long" = 2 }

[reservoir]
oil_volume = "50 gal"

[duty]
time_to_warm = "4 h"
shift_start = "06:30"

[supply]
voltage = "230 V"
current = "16 A"

[[oil]]
name = "oil in service"
in_service = true
viscosity = { "40 °C" = "32 cSt" }
viscosity_index = 150
cold_viscosity = { "-20 °C" = "1300 mPa·s" }
pour_point = "-39C"
"#
    );
    assert_eq!(script.unused().count(), 0);
    assert!(script.asked.len() <= 22, "{} questions", script.asked.len());
    // What was typed in another unit is shown back, and the oil is set against the pump at once.
    let said = script.said.join("\n");
    assert!(said.contains("5 ft (1.524 m)") && said.contains("50 gal (189.271 L)"), "{said}");
    assert!(said.contains("at -30.5 °C oil in service is about"), "{said}");
    // The file gives the same advice when it is read again.
    let case = file.check().unwrap();
    let again = CaseFile::read("case", &file.write()).check().unwrap();
    assert_eq!(advice::decide(&case), advice::decide(&again));
}

#[test]
fn a_flow_stands_in_for_the_displacement_and_a_mixture_for_an_oil() {
    let mut answers = QUICK[..10].to_vec();
    answers.extend([("oil1.how", "mixture"), ("oil1.mixture", "32")]);
    let file = run(&mut Script::new("s", &answers), &mut Draft::new(), Length::Quick).unwrap();
    assert_eq!(file.get("oil[1].class"), Some("HM 46"));
    assert_eq!(file.get("oil[1].pour_point"), Some("-15 °C"));
    let case = file.check().unwrap();
    assert_eq!(case.oils[0].pour_point().map(|t| t.as_celsius()), Some(-15.0));

    let flow = ("pump.rated_flow", "150 L/min at 2000 rpm");
    let mut answers = QUICK.to_vec();
    answers.push(flow);
    let file = run(&mut Script::new("s", &answers), &mut Draft::new(), Length::Full).unwrap();
    assert_eq!(file.get("pump.displacement"), Some("75 cm³"));
}

/// Answers in order, whatever is asked; `<` goes back.
struct Tape(VecDeque<(&'static str, &'static str)>, Vec<String>);

impl Ask for Tape {
    fn ask(&mut self, prompt: &Prompt<'_>) -> Result<Reply, Stop> {
        let Some((id, text)) = self.0.pop_front() else { return Err(Stop::Interrupted) };
        assert_eq!(prompt.id, id, "another question than expected");
        if text == "<" {
            return Ok(Reply::Back);
        }
        let text = if text.is_empty() { prompt.default.unwrap_or("?") } else { text };
        (prompt.check)(text).map_err(|message| Stop::Script(format!("{id}: {message}")))?;
        Ok(Reply::Text(text.to_owned()))
    }

    fn say(&mut self, text: &str) {
        self.1.push(text.to_owned());
    }
}

#[test]
fn back_keeps_the_answer_and_a_change_drops_what_hangs_on_it() {
    let mut tape = Tape(
        [
            ("units", "metric"),
            ("site.minimum_temperature", "-30 °C"),
            ("site.elevation", "<"),
            // The earlier answer stands as the default: Enter keeps it.
            ("site.minimum_temperature", ""),
            ("site.elevation", "640 m"),
            ("pump.kind", "vane"),
            ("pump.neutral", "open-centre"),
            ("pump.displacement", "40 cm³"),
            ("hose.outside", "47 mm"),
            ("suction.length", "1 m"),
            ("hose.bends", "one"),
            ("reservoir.oil_volume", "90 L"),
            ("reservoir.exposure", "enclosed"),
            ("duty.time_to_warm", "3 h"),
            ("duty.shift_start", "06:00"),
            ("oil1.how", "none"),
            ("supply.voltage", "?"),
            ("review", "hose.outside"),
            ("hose.outside", "?"),
            ("review", "oil1.how"),
            ("oil1.how", "class"),
            ("oil1.class", "HV 32"),
            ("oil1.pour_point", "?"),
            ("review", "done"),
        ]
        .into(),
        Vec::new(),
    );
    let mut draft = Draft::new();
    let file = run(&mut tape, &mut draft, Length::Quick).unwrap();
    let said = tape.1.join("\n");
    for dropped in ["suction.length (1 m)", "hose.bends (one)"] {
        assert!(said.contains(&format!("no longer asked, dropped: {dropped}")), "{said}");
    }
    assert_eq!(file.get("suction.length"), None);
    assert_eq!(file.get("site.minimum_temperature"), Some("-30 °C"));
    assert_eq!(file.get("oil[1].class"), Some("HV 32"));
    assert!(file.check().is_ok());
}

#[test]
fn what_is_typed_wrong_is_answered_with_what_to_type() {
    let asked = |id: &str, text: &str| -> String {
        let mut answers = QUICK.to_vec();
        answers.retain(|(other, _)| *other != id);
        answers.push(("pump.inlet_pressure_start_min", "60 kPa"));
        answers.retain(|(other, _)| *other != id);
        let id: &'static str = id.to_owned().leak();
        let text: &'static str = text.to_owned().leak();
        answers.push((id, text));
        match run(&mut Script::new("s", &answers), &mut Draft::new(), Length::Full) {
            Ok(_) => "taken".to_owned(),
            Err(stop) => stop.to_string(),
        }
    };
    let minimum = "site.minimum_temperature";
    let rows = [
        (
            minimum,
            "-38",
            "s: site.minimum_temperature: `-38` has no unit; write for example `-38 °C`",
        ),
        (minimum, "-38C", "taken"),
        (minimum, "−38,5 °C", "taken"),
        (
            minimum,
            "40",
            "s: site.minimum_temperature: `40` has no unit, and is it below zero? type `-40 °C`, or `+40 °C` if it is meant",
        ),
        (
            minimum,
            "40 °C",
            "s: site.minimum_temperature: 40 °C is warm for the coldest morning; type `-40 °C`, or `+40 °C` if it is meant",
        ),
        (
            minimum,
            "-400 °C",
            "s: site.minimum_temperature: temperature must be between -90 and 400 °C, but is -400 °C",
        ),
        (minimum, "?", "s: site.minimum_temperature: is needed: without it there is no advice"),
        ("oil1.viscosity.40 °C", "46", "s: oil1.viscosity.40 °C: `46` has no unit"),
        ("oil1.viscosity.40 °C", "32 mm2/s", "taken"),
        ("reservoir.oil_volume", "10 gal", "taken"),
        ("reservoir.oil_volume", "0 L", "s: reservoir.oil_volume: volume must be between"),
        ("pump.kind", "piston", "s: pump.kind: `piston` is none of external-gear"),
        ("hose.outside", "900 mm", "s: hose.outside: no suction hose of 900 mm outside"),
        (
            "pump.inlet_pressure_start_min",
            "9 psi",
            "s: pump.inlet_pressure_start_min: is `9 psi` absolute or under the air?",
        ),
        ("pump.inlet_pressure_start_min", "9 psia", "taken"),
        ("pump.inlet_pressure_start_min", "10 inHg vacuum", "taken"),
        ("duty.shift_start", "6", "s: duty.shift_start: `6` is not a time of day"),
        ("oil1.cold_viscosity", "-20 °C = 40", "s: oil1.cold_viscosity: `40` has no unit"),
    ];
    for (id, text, want) in rows {
        let found = asked(id, text);
        assert!(found.starts_with(want), "{id} = {text}: {found}");
    }
}

/// Everything the full interview asks, with good answers where "I don't know" will not do.
#[test]
fn the_full_interview_asks_for_every_key() {
    let answers = [
        ("site.minimum_temperature", "-30 °C"),
        ("machine.accumulator.precharge", "30 bar"),
        ("machine.accumulator.at", "20 °C"),
        ("pump.kind", "axial-piston"),
        ("pump.neutral", "closed-loop"),
        ("pump.displacement", "75 cm³"),
        ("suction.bore", "50.8 mm"),
        ("suction.length", "1.5 m"),
        ("hose.strainer", "clean"),
        ("suction.strainer.loss", "2.5 kPa"),
        ("suction.strainer.at_flow", "150 L/min"),
        ("suction.strainer.at_viscosity", "32 mm²/s"),
        ("case_drain.bore", "16 mm"),
        ("case_drain.length", "2 m"),
        ("case_drain.flow", "4 L/min"),
        ("reservoir.oil_volume", "200 L"),
        ("reservoir.insulation.thickness", "25 mm"),
        ("reservoir.cooldown.from", "20 °C"),
        ("reservoir.cooldown.to", "-5 °C"),
        ("reservoir.cooldown.air", "-25 °C"),
        ("reservoir.cooldown.over", "8 h"),
        ("duty.time_to_warm", "4 h"),
        ("duty.parked_at", "18:00"),
        ("duty.parked_oil", "50 °C"),
        ("oil1.how", "sheet"),
        ("oil1.class", "HV 32"),
        ("oil1.viscosity.40 °C", "32 mm²/s"),
        ("oil1.viscosity.100 °C", "6.3 mm²/s"),
        ("oil1.pour_point", "-39 °C"),
        ("oil1.more", "yes"),
        ("oil2.how", "sheet"),
        ("oil2.viscosity.40 °C", "none"),
        ("oil2.viscosity.100 °F", "105 SUS"),
        ("oil2.viscosity.210 °F", "41.5 SUS"),
        ("oil2.pour_point", "-50 °F"),
        ("supply.voltage", "230 V"),
        ("supply.current", "16 A"),
        ("element.power", "500 W"),
        ("element.surface", "700 cm²"),
    ];
    let mut script = Script::new("s", &answers);
    let file = run(&mut script, &mut Draft::new(), Length::Full).unwrap();
    let case = file.check().unwrap_or_else(|faults| panic!("{faults}"));
    assert_eq!(case.oils.len(), 2);
    assert!(script.asked.len() > 85, "{}", script.asked.len());
    // A section may be skipped, with its questions.
    let mut short = answers.to_vec();
    short.retain(|(id, _)| {
        !id.starts_with("case_drain") && !id.starts_with("suction") && !id.starts_with("hose")
    });
    short.push(("skip.Suction line", "skip"));
    let mut script = Script::new("s", &short);
    let file = run(&mut script, &mut Draft::new(), Length::Full).unwrap();
    assert_eq!(file.get("suction.bore"), None);
    assert!(!script.asked.iter().any(|id| id.starts_with("suction") || id.starts_with("hose")));
}

#[test]
fn an_existing_case_gives_the_defaults() {
    let text = include_str!("../examples/skarn-loader.toml");
    let base = CaseFile::read("loader", text);
    let mut script = Script::new(
        "s",
        &[("oil1.how", "sheet"), ("hose.outside", "61 mm"), ("duty.shift_start", "07:00")],
    );
    let file =
        interview(&mut script, &base, &mut Draft::new(), Length::Quick, &BuiltIn, &mut |_| Ok(()))
            .unwrap();
    // What was not asked for stays; what was answered is set.
    assert_eq!(file.get("case_drain.bore"), Some("16 mm"));
    assert_eq!(file.get("oil[3].name"), Some("synthetic"));
    assert_eq!(file.get("duty.shift_start"), Some("07:00"));
    assert_eq!(file.get("site.minimum_temperature"), Some("-38 °C"));
    assert!(file.check().is_ok());
}

// The program in a pseudo-terminal.

struct Terminal {
    child: Child,
    input: std::fs::File,
    output: Receiver<Vec<u8>>,
    screen: vt100::Parser,
    bytes: usize,
}

impl Drop for Terminal {
    fn drop(&mut self) {
        let _ = self.child.kill();
        let _ = self.child.wait();
    }
}

const PATIENCE: Duration = Duration::from_secs(20);

impl Terminal {
    fn start(folder: &std::path::Path, args: &[&str], columns: u16) -> Self {
        let master =
            rustix::pty::openpt(rustix::pty::OpenptFlags::RDWR | rustix::pty::OpenptFlags::NOCTTY)
                .unwrap();
        rustix::pty::grantpt(&master).unwrap();
        rustix::pty::unlockpt(&master).unwrap();
        let name = rustix::pty::ptsname(&master, Vec::new()).unwrap();
        let size =
            rustix::termios::Winsize { ws_row: 40, ws_col: columns, ws_xpixel: 0, ws_ypixel: 0 };
        rustix::termios::tcsetwinsize(&master, size).unwrap();
        let slave = || {
            let file = std::fs::OpenOptions::new()
                .read(true)
                .write(true)
                .open(name.to_str().unwrap())
                .unwrap();
            Stdio::from(file)
        };
        let child = Command::new(env!("CARGO_BIN_EXE_coldsump"))
            .args(args)
            .current_dir(folder)
            .env("NO_COLOR", "1")
            .env("TERM", "xterm")
            .stdin(slave())
            .stdout(slave())
            .stderr(slave())
            .spawn()
            .unwrap();
        let input = std::fs::File::from(master);
        let mut reading = input.try_clone().unwrap();
        let (send, output) = channel();
        std::thread::spawn(move || {
            let mut buffer = [0; 4096];
            while let Ok(count) = reading.read(&mut buffer) {
                if count == 0 || send.send(buffer[..count].to_vec()).is_err() {
                    break;
                }
            }
        });
        let cells = |count: u16| std::num::NonZeroU16::new(count).unwrap();
        let screen = vt100::Parser::new(cells(40), cells(columns), 2000);
        Self { child, input, output, screen, bytes: 0 }
    }

    fn pump(&mut self, wait: Duration) -> bool {
        match self.output.recv_timeout(wait) {
            Ok(bytes) => {
                self.bytes += bytes.len();
                self.screen.process(&bytes);
                true
            }
            Err(_) => false,
        }
    }

    /// The screen without the breaks of narrow lines.
    fn text(&self) -> String {
        self.screen.screen().contents()
    }

    fn wait_for(&mut self, words: &str) {
        let wanted: String = words.split_whitespace().collect();
        let until = Instant::now() + PATIENCE;
        loop {
            let seen: String = self.text().split_whitespace().collect();
            if seen.contains(&wanted) {
                return;
            }
            assert!(Instant::now() < until, "`{words}` never came; the screen:\n{}", self.text());
            self.pump(Duration::from_millis(50));
        }
    }

    fn keys(&mut self, keys: &str) {
        self.input.write_all(keys.as_bytes()).unwrap();
        self.input.flush().unwrap();
    }

    /// Waits for a question to be the one that is open, then answers it.
    fn answer(&mut self, question: &str, keys: &str) {
        self.wait_for(&format!("> {question}"));
        self.keys(keys);
        self.keys("\r");
    }

    fn ended(&mut self) -> Option<i32> {
        let until = Instant::now() + PATIENCE;
        loop {
            while self.pump(Duration::from_millis(20)) {}
            if let Some(status) = self.child.try_wait().unwrap() {
                return status.code();
            }
            assert!(Instant::now() < until, "it does not end; the screen:\n{}", self.text());
        }
    }
}

fn folder(name: &str) -> std::path::PathBuf {
    let folder = std::env::temp_dir().join(format!("coldsump-iv-{name}-{}", std::process::id()));
    let _ = std::fs::remove_dir_all(&folder);
    std::fs::create_dir_all(&folder).unwrap();
    folder
}

/// Down so many times in a list.
fn down(times: usize) -> String {
    "\u{1b}[B".repeat(times)
}

#[test]
fn a_quick_run_in_a_terminal_ends_in_the_advice() {
    for columns in [80, 40] {
        let folder = folder(&format!("quick{columns}"));
        let mut t = Terminal::start(&folder, &["interview", "--quick"], columns);
        t.answer("Show results in metric or US units?", "");
        t.answer("Coldest temperature the machine must be started at?", "-30 °C");
        t.answer("Height above sea level?", "");
        t.answer("Which kind of pump draws from the tank?", &down(3));
        t.answer("What does the oil do with all levers in neutral?", &down(1));
        t.answer("Displacement of all that draws through the suction line?", "75 cm3");
        // Esc goes back to the question before, its answer kept.
        t.wait_for("> Outside diameter of the suction hose?");
        t.keys("\u{1b}");
        t.wait_for("> Displacement of all that draws through the suction line? (75 cm3)");
        t.keys("\r");
        t.answer("Outside diameter of the suction hose?", "61 mm");
        t.answer("Length of the suction line?", "1.5 m");
        t.answer("How does the hose run?", &down(2));
        t.answer("Oil in the tank?", "200 L");
        t.answer("How does the tank stand in the wind?", "");
        t.answer("Hours the heater may take?", "4 h");
        t.answer("When does the shift start?", "");
        t.answer("How is the oil known?", "");
        t.answer("Viscosity at 40 °C?", "32 cSt");
        t.answer("Viscosity at 100 °C?", "6.3 cSt");
        t.answer(
            "Any viscosity measured in the cold? It is the one figure that helps most",
            "none",
        );
        t.answer("Pour point?", "-39 °C");
        t.answer("Supply voltage?", "230 V");
        t.answer("Rating of the circuit's breaker?", "16 A");
        t.answer("Is all that right, or change an answer?", "");
        t.wait_for("try: coldsump advise case.toml");
        assert_eq!(t.ended(), Some(0));
        let written = std::fs::read_to_string(folder.join("case.toml")).unwrap();
        assert!(written.contains("bore = \"50.8 mm\""), "{written}");
        assert!(std::fs::read_to_string(folder.join("case.md")).unwrap().contains("## Procedure"));
        assert!(!folder.join("case.draft.toml").exists());
        // Per key some hundred bytes at the most: prompts are redrawn, the screen is not.
        assert!(t.bytes < 120_000, "{} bytes to the terminal", t.bytes);
        std::fs::remove_dir_all(&folder).unwrap();
    }
}

#[test]
fn ctrl_c_saves_and_the_next_start_goes_on() {
    let folder = folder("stop");
    let mut t = Terminal::start(&folder, &["interview", "--quick"], 80);
    t.answer("Show results in metric or US units?", "");
    t.answer("Coldest temperature the machine must be started at?", "-31 °C");
    t.wait_for("> Height above sea level?");
    t.keys("\u{3}");
    t.wait_for("your answers are in case.draft.toml");
    assert_eq!(t.ended(), Some(130));
    let mut t = Terminal::start(&folder, &["interview", "--quick"], 80);
    t.answer("An interview was left unfinished. Go on?", "");
    t.wait_for("> Height above sea level?");
    let draft = std::fs::read_to_string(folder.join("case.draft.toml")).unwrap();
    assert!(draft.contains("-31 °C"), "{draft}");
    drop(t);
    std::fs::remove_dir_all(&folder).unwrap();
}

#[test]
fn killed_hard_at_every_question_nothing_is_lost() {
    // The answers of a full run, in the order in which they are asked.
    let mut script = Script::new("s", QUICK);
    run(&mut script, &mut Draft::new(), Length::Full).unwrap();
    let asked: Vec<String> = script.asked.iter().filter(|id| *id != "review").cloned().collect();
    assert!(asked.len() > 75, "{}", asked.len());
    let folder = folder("kill");
    let drafted = folder.join("case.draft.toml");
    let answer = |id: &str| -> String {
        QUICK
            .iter()
            .find(|(other, _)| *other == id)
            .map_or_else(String::new, |(_, text)| (*text).to_owned())
    };
    // In plain lines, so that each start is quick; the draft is the same.
    for (at, id) in asked.iter().enumerate() {
        let mut child = Command::new(env!("CARGO_BIN_EXE_coldsump"))
            .args(["interview", "--plain"])
            .current_dir(&folder)
            .stdin(Stdio::piped())
            .stdout(Stdio::null())
            .stderr(Stdio::piped())
            .spawn()
            .unwrap();
        let mut input = child.stdin.take().unwrap();
        let mut errors = child.stderr.take().unwrap();
        if at > 0 {
            input.write_all(b"go-on\n").unwrap();
        }
        input.write_all(format!("{}\n", answer(id)).as_bytes()).unwrap();
        input.flush().unwrap();
        // Wait for the question after this one, then kill.
        let wanted =
            asked.get(at + 1).map_or_else(|| "[review]".to_owned(), |next| format!("[{next}]"));
        let mut seen = String::new();
        let mut buffer = [0; 1024];
        while !seen.contains(&wanted) {
            let count = errors.read(&mut buffer).unwrap();
            assert!(count > 0, "no {wanted} after {id}:\n{seen}");
            seen.push_str(&String::from_utf8_lossy(&buffer[..count]));
        }
        child.kill().unwrap();
        child.wait().unwrap();
        let draft = Draft::read("draft", &std::fs::read_to_string(&drafted).unwrap()).unwrap();
        assert_eq!(draft.answers().count(), at + 1, "after {id}");
        for earlier in &asked[..=at] {
            assert!(draft.get(earlier).is_some(), "{earlier} lost after {id}");
        }
    }
    std::fs::remove_dir_all(&folder).unwrap();
}

#[test]
fn without_a_terminal_it_says_what_to_do() {
    let output = Command::new(env!("CARGO_BIN_EXE_coldsump"))
        .arg("interview")
        .stdin(Stdio::null())
        .output()
        .unwrap();
    assert_eq!(output.status.code(), Some(2));
    let said = String::from_utf8(output.stderr).unwrap();
    assert!(
        said.starts_with("the interview needs a terminal\n\ntry: coldsump interview --plain"),
        "{said}"
    );
}

#[test]
fn an_answer_file_runs_the_whole_interview() {
    let folder = folder("answers");
    let text: String = QUICK.iter().map(|(id, text)| format!("\"{id}\" = \"{text}\"\n")).collect();
    std::fs::write(folder.join("answers.toml"), &text).unwrap();
    let go = |extra: &[&str]| {
        Command::new(env!("CARGO_BIN_EXE_coldsump"))
            .args(["interview", "--quick", "--answers", "answers.toml"])
            .args(extra)
            .current_dir(&folder)
            .stdin(Stdio::null())
            .output()
            .unwrap()
    };
    let output = go(&["-o", "made.toml"]);
    assert_eq!(output.status.code(), Some(0), "{}", String::from_utf8_lossy(&output.stderr));
    let written = std::fs::read_to_string(folder.join("made.toml")).unwrap();
    assert!(written.contains("shift_start = \"06:30\""), "{written}");
    // Never over a file that is there.
    assert_eq!(go(&["-o", "made.toml"]).status.code(), Some(2));
    std::fs::write(folder.join("answers.toml"), text.replace("4 h", "four hours")).unwrap();
    let output = go(&["-o", "other.toml"]);
    assert_eq!(output.status.code(), Some(2));
    let said = String::from_utf8_lossy(&output.stderr).into_owned();
    assert!(said.contains("answers.toml: duty.time_to_warm: `four hours`"), "{said}");
    assert!(!folder.join("other.toml").exists());
    std::fs::remove_dir_all(&folder).unwrap();
}
