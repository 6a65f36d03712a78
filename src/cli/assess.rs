//! `coldsump assess`.

use super::args::{AssessArgs, AssessFormat, LookArgs};
use super::climate::Folders;
use super::{DONE, FAILED, WRONG, output};
use anyhow::Result;
use coldsump::case::{Case, CaseFile};
use coldsump::{advice, report};
use std::path::Path;

pub(crate) fn run(args: &AssessArgs, look: &LookArgs) -> Result<u8> {
    let look = output::look(look);
    let mut code = DONE;
    for (at, path) in args.cases.iter().enumerate() {
        let case = match case(path, &args.set) {
            Ok(case) => case,
            Err(Trouble::Wrong(message)) => {
                tell!("{message}");
                code = if code == FAILED { FAILED } else { WRONG };
                continue;
            }
            Err(Trouble::Io(error)) => {
                tell!("coldsump: {error:#}");
                code = FAILED;
                continue;
            }
        };
        let oils: Vec<_> = case
            .oils
            .iter()
            .filter(|oil| args.oil.is_empty() || args.oil.iter().any(|name| name == oil.name()))
            .map(|oil| (oil, advice::assess(&case, oil)))
            .collect();
        if oils.is_empty() {
            let names: Vec<&str> = case.oils.iter().map(coldsump::oil::Oil::name).collect();
            tell!(
                "{}: no oil of that name\n\ntry: --oil \"{}\"",
                path.display(),
                names.join("\" or \"")
            );
            code = if code == FAILED { FAILED } else { WRONG };
            continue;
        }
        match args.format {
            AssessFormat::Json => {
                let json = report::assessment_json(&case, &oils);
                output::put(&output::json(&json, args.cases.len() == 1)?)?;
            }
            AssessFormat::Text => {
                let units = output::units(args.units).unwrap_or(case.units);
                let document = report::assessment(&case, &oils, units);
                let gap = if at > 0 { "\n" } else { "" };
                output::put(&format!("{gap}{}", report::text(&document, look)))?;
            }
        }
    }
    Ok(code)
}

/// Why there is no case.
pub(crate) enum Trouble {
    /// What was typed or written is wrong.
    Wrong(String),
    /// It could not be read.
    Io(anyhow::Error),
}

/// A case file with keys set over it, checked.
pub(crate) fn case(path: &Path, sets: &[String]) -> Result<Case, Trouble> {
    file(path, sets)?
        .check_in(&Folders::of(path))
        .map_err(|faults| Trouble::Wrong(faults.to_string()))
}

/// A case file with keys set over it.
pub(crate) fn file(path: &Path, sets: &[String]) -> Result<CaseFile, Trouble> {
    let (name, text) = output::read(path).map_err(Trouble::Io)?;
    let mut file = CaseFile::read(&name, &text);
    for set in sets {
        let Some((key, value)) = set.split_once('=') else {
            return Err(Trouble::Wrong(format!(
                "--set: `{set}` has no `=`; write for example `--set \"suction.bore=63.5 mm\"`"
            )));
        };
        file.set(key, value).map_err(|fault| Trouble::Wrong(fault.to_string()))?;
    }
    Ok(file)
}
