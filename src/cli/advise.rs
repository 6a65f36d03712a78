//! `coldsump advise`.

use super::args::{AdviseArgs, AdviseFormat, LookArgs};
use super::assess::{Trouble, file};
use super::climate::Folders;
use super::{DONE, FAILED, NO_PLAN, WRONG, output};
use anyhow::Result;
use coldsump::case::{Case, Units};
use coldsump::{advice, report};
use std::path::Path;

pub(crate) fn run(args: &AdviseArgs, look: &LookArgs) -> Result<u8> {
    let look = output::look(look);
    let mut code = DONE;
    let mut out = String::new();
    for (at, path) in args.cases.iter().enumerate() {
        let case = match case(path, &args.set, &args.oil) {
            Ok(case) => case,
            Err(Trouble::Wrong(message)) => {
                tell!("{message}");
                code = worse(code, WRONG);
                continue;
            }
            Err(Trouble::Io(error)) => {
                tell!("coldsump: {error:#}");
                code = worse(code, FAILED);
                continue;
            }
        };
        let advice = advice::advise(&case);
        if !advice.decision.starts() {
            code = worse(code, NO_PLAN);
        }
        let units: Units = output::units(args.units).unwrap_or(case.units);
        let document = || report::advice(&case, &advice, units);
        if at > 0 && args.format != AdviseFormat::Json {
            out.push('\n');
        }
        match args.format {
            AdviseFormat::Json => {
                let json = report::advice_json(&case, &advice);
                out.push_str(&output::json(&json, args.cases.len() == 1)?);
            }
            AdviseFormat::Html => out.push_str(&report::html(&case, &advice, units)),
            AdviseFormat::Markdown => out.push_str(&report::markdown(&document())),
            AdviseFormat::Text => {
                let look = if args.output.is_some() {
                    report::Look { color: false, ..look }
                } else {
                    look
                };
                out.push_str(&report::text(&document(), look));
                if args.charts {
                    out.push_str(&charts(&case, &advice, units, look));
                }
            }
        }
        if args.output.is_none() {
            output::put(&out)?;
            out.clear();
        }
    }
    if let Some(path) = &args.output {
        if out.is_empty() {
            return Ok(code);
        }
        output::write(path, &out, args.force)?;
    }
    Ok(code)
}

/// The charts of the oil advised on, in characters.
fn charts(case: &Case, advice: &advice::Advice, units: Units, look: report::Look) -> String {
    use report::chart;
    let mut out = String::new();
    let decision = &advice.decision;
    let Some(at) = decision.focus() else { return out };
    let (Some(oil), Some(found)) = (case.oils.get(at), decision.oils.get(at)) else { return out };
    let night = advice::night(case, oil, found);
    let drawn = [
        Some(chart::viscosity(case, &[(oil, found)], units)),
        chart::inlet(case, oil, found, units).ok(),
        chart::speed(case, oil, found, units).ok(),
        chart::overnight(case, found, &night, units),
    ];
    for chart in drawn.iter().flatten() {
        out.push('\n');
        out.push_str(&chart::terminal(chart, look.width, 20, look.ascii));
    }
    out
}

/// The graver of two exit codes: a failure, then wrong input, then no plan.
pub(crate) const fn worse(one: u8, other: u8) -> u8 {
    const fn grave(code: u8) -> u8 {
        match code {
            DONE => 0,
            NO_PLAN => 1,
            WRONG => 2,
            _ => 3,
        }
    }
    if grave(other) > grave(one) { other } else { one }
}

/// A case with keys set over it, and only some of its oils.
pub(crate) fn case(path: &Path, sets: &[String], oils: &[String]) -> Result<Case, Trouble> {
    let mut file = file(path, sets)?;
    let sites = Folders::of(path);
    let case = file.check_in(&sites).map_err(|faults| Trouble::Wrong(faults.to_string()))?;
    if oils.is_empty() {
        return Ok(case);
    }
    let names: Vec<&str> = case.oils.iter().map(coldsump::oil::Oil::name).collect();
    if let Some(missing) = oils.iter().find(|oil| !names.contains(&oil.as_str())) {
        return Err(Trouble::Wrong(format!(
            "{}: no oil of the name {missing:?}\n\ntry: --oil \"{}\"",
            path.display(),
            names.join("\" or \"")
        )));
    }
    let keep: Vec<usize> = names
        .iter()
        .enumerate()
        .filter(|(_, name)| oils.iter().any(|oil| oil == *name))
        .map(|(at, _)| at)
        .collect();
    if case.lists_oils() {
        file.keep_oils(&keep);
    } else {
        for (at, name) in keep.iter().filter_map(|at| names.get(*at)).enumerate() {
            file.set(&format!("oil[{}].class", at + 1), name)
                .map_err(|fault| Trouble::Wrong(fault.to_string()))?;
        }
    }
    file.check_in(&sites).map_err(|faults| Trouble::Wrong(faults.to_string()))
}
