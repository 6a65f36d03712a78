//! `coldsump fleet`: rows in, decisions out, in input order, on all cores.

use super::args::{FleetArgs, FleetFormat, LookArgs};
use super::climate::Folders;
use super::{DONE, NO_PLAN, WRONG, advise::worse, output};
use anyhow::{Context, Result};
use coldsump::case::{CaseFile, Edit};
use coldsump::fleet::{Machine, Row, Rows};
use coldsump::quantity::Power;
use coldsump::{advice, report};
use rayon::prelude::*;
use std::collections::HashMap;
use std::io::{BufRead, IsTerminal, Read, Seek, Write};
use std::path::Path;

/// Rows worked on at once: memory does not grow with the fleet.
const CHUNK: usize = 1024;

/// What a row came to.
struct Done {
    line: String,
    machine: Option<Machine>,
    faults: Vec<String>,
    starts: bool,
}

pub(crate) fn run(args: &FleetArgs, look: &LookArgs) -> Result<u8> {
    let sets = match edits(&args.set) {
        Ok(sets) => sets,
        Err(message) => {
            tell!("{message}");
            return Ok(WRONG);
        }
    };
    if let Some(sweep) = &args.sweep {
        return self::sweep(args, look, &sets, sweep);
    }
    let mut sink = match Sink::open(args)? {
        Ok(sink) => sink,
        Err(message) => {
            tell!("{message}");
            return Ok(WRONG);
        }
    };
    let keeps = matches!(args.format, FleetFormat::Text | FleetFormat::Html);
    let mut machines: Vec<Machine> = Vec::new();
    let mut faults: Vec<String> = Vec::new();
    let mut wrong = 0_u64;
    let mut code = DONE;
    let mut skip = sink.rows;
    let bar = bar();
    let whole = each(args, &sets, &mut |chunk: Vec<Done>| {
        for done in chunk {
            bar.inc(1);
            wrong += done.faults.len() as u64;
            let room = MOST_FAULTS.saturating_sub(faults.len());
            faults.extend(done.faults.iter().take(room).cloned());
            if !done.faults.is_empty() {
                code = worse(code, WRONG);
            } else if !done.starts {
                code = worse(code, NO_PLAN);
            }
            if keeps {
                machines.extend(done.machine);
            } else if skip > 0 {
                skip -= 1;
            } else {
                sink.put(&done.line)?;
            }
        }
        sink.flush()
    });
    bar.finish_and_clear();
    match whole? {
        Ok(()) => {}
        Err(message) => {
            tell!("{message}");
            return Ok(WRONG);
        }
    }
    if keeps {
        let limit = args.yard_power.map_or(f64::INFINITY, Power::as_watts);
        let units = output::units(args.units).unwrap_or_default();
        let title = args.fleet.file_stem().map_or_else(|| "fleet".into(), |s| s.to_string_lossy());
        let document = report::fleet(&title, &machines, &faults, limit, units);
        let text = if args.format == FleetFormat::Html {
            report::page(&title, &document)
        } else {
            let look = output::look(look);
            let color = look.color && args.output.is_none();
            report::text(&document, report::Look { color, ..look })
        };
        match &args.output {
            Some(path) => output::write(path, &text, args.force)?,
            None => output::put(&text)?,
        }
    }
    for fault in &faults {
        tell!("{fault}");
    }
    if wrong > faults.len() as u64 {
        tell!(
            "{} more faults; csv and jsonl name each beside its row",
            wrong - faults.len() as u64
        );
    }
    Ok(code)
}

/// Base files kept read.
const MOST_BASES: usize = 1024;

/// Faults told at the end; every one stands in the output.
const MOST_FAULTS: usize = 50;

/// Reads the fleet and hands over what chunks of it came to, in order.
fn each(
    args: &FleetArgs,
    sets: &[Edit],
    take: &mut dyn FnMut(Vec<Done>) -> Result<()>,
) -> Result<Result<(), String>> {
    let (name, reader): (String, Box<dyn Read>) = if args.fleet == Path::new("-") {
        ("standard input".to_owned(), Box::new(std::io::stdin()))
    } else {
        let name = args.fleet.display().to_string();
        let file =
            std::fs::File::open(&args.fleet).with_context(|| format!("cannot read {name}"))?;
        (name, Box::new(file))
    };
    let rows = match Rows::open(reader) {
        Ok(rows) => rows,
        Err(error) => {
            let line = error.line.map_or_else(String::new, |line| format!("{line}:"));
            return Ok(Err(format!("{name}:{line} {}", error.message)));
        }
    };
    let folder = args.fleet.parent().unwrap_or_else(|| Path::new("")).to_path_buf();
    let sites = Sites(Folders::of(&args.fleet));
    let mut bases: HashMap<String, Result<CaseFile, String>> = HashMap::new();
    let mut rows = rows.peekable();
    while rows.peek().is_some() {
        let chunk: Vec<_> = rows.by_ref().take(CHUNK).collect();
        if bases.len() > MOST_BASES {
            bases.clear();
        }
        for row in chunk.iter().flatten() {
            let Some(base) = row.base.clone().or_else(|| args.base.clone()) else { continue };
            bases.entry(base.clone()).or_insert_with(|| {
                let path = folder.join(&base);
                let path = if path.exists() { path } else { base.clone().into() };
                let (name, text) = output::read(&path).map_err(|error| format!("{error:#}"))?;
                Ok(CaseFile::read(&name, &text))
            });
        }
        let done: Vec<Done> = chunk
            .into_par_iter()
            .map(|row| match row {
                Ok(row) => {
                    let base = row.base.as_ref().or(args.base.as_ref()).and_then(|b| bases.get(b));
                    one(args, &name, &row, base, sets, &sites)
                }
                Err(error) => {
                    let line = error.line.unwrap_or(0);
                    bad(args, "", &[format!("{name}:{line}: {}", error.message)])
                }
            })
            .collect();
        take(done)?;
    }
    Ok(Ok(()))
}

/// Climate files are looked up from all threads.
struct Sites(Folders);

/// One row, decided.
fn one(
    args: &FleetArgs,
    name: &str,
    row: &Row,
    base: Option<&Result<CaseFile, String>>,
    sets: &[Edit],
    sites: &Sites,
) -> Done {
    let at = |message: &str| format!("{name}:{}: {message}", row.line);
    let base = match base {
        Some(Ok(base)) => Some(base),
        Some(Err(message)) => return bad(args, &row.machine, &[at(&format!("base: {message}"))]),
        None => None,
    };
    let case = match row.case_file(base, sets) {
        Ok(file) => file.check_in(&sites.0),
        Err(message) => return bad(args, &row.machine, &[at(&message)]),
    };
    let case = match case {
        Ok(case) => case,
        Err(faults) => {
            let all: Vec<String> = faults
                .0
                .iter()
                .map(|fault| at(&format!("{}: {}", fault.key, fault.message)))
                .collect();
            return bad(args, &row.machine, &all);
        }
    };
    let full = args.format == FleetFormat::Jsonl || args.card.is_some();
    let (machine, advice) = if full {
        let advice = advice::advise(&case);
        (Machine::from_decision(&row.machine, row.count, &case, &advice.decision), Some(advice))
    } else {
        (Machine::decide(&row.machine, row.count, &case), None)
    };
    let mut faults = Vec::new();
    if let (Some(folder), Some(advice)) = (&args.card, &advice) {
        let units = output::units(args.units).unwrap_or(case.units);
        let safe: String = row
            .machine
            .chars()
            .map(|c| if c.is_alphanumeric() || c == '-' { c } else { '-' })
            .take(60)
            .collect();
        let path = folder.join(format!("{:05}-{safe}.html", row.line));
        if let Err(error) = output::write(&path, &report::html(&case, advice, units), args.force) {
            faults.push(at(&format!("{error:#}")));
        }
    }
    let line = match (args.format, &advice) {
        (FleetFormat::Jsonl, Some(advice)) => {
            let mut json = report::advice_json(&case, advice);
            if let Some(map) = json.as_object_mut() {
                map.insert("machine".to_owned(), row.machine.clone().into());
                map.insert("count".to_owned(), row.count.into());
            }
            match output::json(&json, false) {
                Ok(line) => line,
                Err(error) => return bad(args, &row.machine, &[at(&format!("{error:#}"))]),
            }
        }
        (FleetFormat::Csv, _) => report::fleet_row(&machine),
        _ => String::new(),
    };
    Done { line, starts: machine.starts, machine: Some(machine), faults }
}

/// A row that is wrong: told, and marked in the output.
fn bad(args: &FleetArgs, machine: &str, faults: &[String]) -> Done {
    let line = match args.format {
        FleetFormat::Jsonl => {
            let row = serde_json::json!({ "machine": machine, "error": faults });
            output::json(&row, false).unwrap_or_default()
        }
        FleetFormat::Csv => report::fleet_fault(machine, faults),
        _ => String::new(),
    };
    Done { line, machine: None, faults: faults.to_vec(), starts: true }
}

fn edits(sets: &[String]) -> Result<Vec<Edit>, String> {
    sets.iter()
        .map(|set| {
            set.split_once('=').map(|(key, value)| Edit::new(key.trim(), value)).ok_or_else(|| {
                format!("--set: `{set}` has no `=`; write for example `--set \"site.wind=5 m/s\"`")
            })
        })
        .collect()
}

fn bar() -> indicatif::ProgressBar {
    if !std::io::stderr().is_terminal() {
        return indicatif::ProgressBar::hidden();
    }
    let bar = indicatif::ProgressBar::new_spinner();
    bar.set_style(
        indicatif::ProgressStyle::with_template("{pos} machines, {per_sec}, {elapsed}")
            .unwrap_or_else(|_| indicatif::ProgressStyle::default_spinner()),
    );
    bar
}

/// Where rows go as they come: standard output, or a file that a broken run can be gone on with.
struct Sink {
    out: Box<dyn Write>,
    /// Rows that are there already.
    rows: u64,
}

impl Sink {
    fn open(args: &FleetArgs) -> Result<Result<Self, String>> {
        let header = (args.format == FleetFormat::Csv).then(|| report::FLEET_HEADER.to_owned());
        let streams = matches!(args.format, FleetFormat::Csv | FleetFormat::Jsonl);
        let Some(path) = args.output.as_ref().filter(|_| streams) else {
            let mut out: Box<dyn Write> =
                Box::new(std::io::BufWriter::with_capacity(1 << 16, std::io::stdout()));
            if let Some(header) = header {
                out.write_all(header.as_bytes())?;
            }
            return Ok(Ok(Self { out, rows: 0 }));
        };
        let shown = path.display().to_string();
        let there = path.symlink_metadata().is_ok();
        if there && !args.resume && !args.force {
            return Ok(Err(format!(
                "{shown} is there already\n\ntry: --resume to go on with it, --force, or another name"
            )));
        }
        let mut options = std::fs::OpenOptions::new();
        options.read(true).write(true).create(true).truncate(!args.resume);
        let mut file = options.open(path).with_context(|| format!("cannot write {shown}"))?;
        let mut rows = 0_u64;
        let mut end = 0_u64;
        if args.resume {
            let mut reader = std::io::BufReader::new(&file);
            let mut line = Vec::new();
            loop {
                line.clear();
                let read = reader.read_until(b'\n', &mut line)?;
                // A line without its end is one that was being written.
                if read == 0 || line.last() != Some(&b'\n') {
                    break;
                }
                end += read as u64;
                rows += 1;
            }
            file.set_len(end)?;
            file.seek(std::io::SeekFrom::End(0))?;
        }
        let mut out: Box<dyn Write> = Box::new(std::io::BufWriter::with_capacity(1 << 16, file));
        if let Some(header) = header {
            if rows == 0 {
                out.write_all(header.as_bytes())?;
            } else {
                rows -= 1;
            }
        }
        Ok(Ok(Self { out, rows }))
    }

    fn put(&mut self, line: &str) -> Result<()> {
        self.out.write_all(line.as_bytes())?;
        Ok(())
    }

    fn flush(&mut self) -> Result<()> {
        self.out.flush()?;
        Ok(())
    }
}

/// One key over a range: how many machines still start.
fn sweep(args: &FleetArgs, look: &LookArgs, sets: &[Edit], text: &str) -> Result<u8> {
    let (key, values) = match steps(text) {
        Ok(steps) => steps,
        Err(message) => {
            tell!("--sweep: {message}");
            return Ok(WRONG);
        }
    };
    let mut rows = Vec::new();
    let mut code = DONE;
    for value in &values {
        let mut with = sets.to_vec();
        with.push(Edit::new(&key, value));
        let mut counts = report::SweepRow::new(value);
        let quiet = FleetArgs { format: FleetFormat::Text, ..args.clone() };
        let whole = each(&quiet, &with, &mut |chunk| {
            for done in chunk {
                match (&done.machine, done.faults.is_empty()) {
                    (Some(machine), true) => counts.add(machine),
                    _ => counts.wrong += 1,
                }
            }
            Ok(())
        })?;
        if let Err(message) = whole {
            tell!("{message}");
            return Ok(WRONG);
        }
        if counts.wrong > 0 {
            code = WRONG;
        }
        rows.push(counts);
    }
    output::put(&report::text(&report::sweep(&key, &rows), output::look(look)))?;
    Ok(code)
}

/// `site.minimum_temperature=-20..-50 °C by 5` as its key and its values.
fn steps(text: &str) -> Result<(String, Vec<String>), String> {
    let example = "write for example `site.minimum_temperature=-20..-50 °C by 5`";
    let (key, range) = text.split_once('=').ok_or(format!("`{text}` has no `=`; {example}"))?;
    let (range, by) =
        range.split_once(" by ").ok_or(format!("`{text}` has no ` by `; {example}"))?;
    let (from, rest) = range.split_once("..").ok_or(format!("`{text}` has no `..`; {example}"))?;
    let number = |text: &str| -> Option<(f64, String)> {
        let text = text.trim().replace(['−', '–'], "-");
        let end =
            text.find(|c: char| !(c.is_ascii_digit() || ".-+".contains(c))).unwrap_or(text.len());
        Some((text.get(..end)?.parse().ok()?, text.get(end..)?.trim().to_owned()))
    };
    let wrong = || format!("`{text}` is no range; {example}");
    let ((from, _), (to, unit), (by, _)) = (
        number(from).ok_or_else(wrong)?,
        number(rest).ok_or_else(wrong)?,
        number(by).ok_or_else(wrong)?,
    );
    let by = by.abs();
    if by <= 0.0 || !((to - from) / by).is_finite() || ((to - from) / by).abs() > 1000.0 {
        return Err(format!("`{text}` has no steps, or over a thousand"));
    }
    let sign = if to < from { -1.0 } else { 1.0 };
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "0 to 1000")]
    let count = ((to - from).abs() / by + 1e-9).floor() as u32;
    let values = (0..=count)
        .map(|n| format!("{} {unit}", from + sign * by * f64::from(n)).trim().to_owned())
        .collect();
    Ok((key.trim().to_owned(), values))
}
