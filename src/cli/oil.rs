//! `coldsump oil`.

use super::args::{LookArgs, OilArgs, OilFormat};
use super::assess::{self, Trouble};
use super::{DONE, FAILED, WRONG, output};
use anyhow::Result;
use coldsump::case::CaseFile;
use coldsump::oil::{BandPolicy, Class, Oil};
use coldsump::quantity::{Quantity, Temperature, TemperatureDifference};
use coldsump::report;

pub(crate) fn run(args: &OilArgs, look: &LookArgs) -> Result<u8> {
    let temperatures = match temperatures(&args.at) {
        Ok(temperatures) => temperatures,
        Err(message) => return wrong(&format!("--at: {message}")),
    };
    let oils = match oils(args) {
        Ok(oils) => oils,
        Err(Trouble::Wrong(message)) => return wrong(&message),
        Err(Trouble::Io(error)) => {
            tell!("coldsump: {error:#}");
            return Ok(FAILED);
        }
    };
    let mut text = String::new();
    for (at, oil) in oils.iter().enumerate() {
        match args.format {
            OilFormat::Json => {
                let json = report::oil_points_json(oil, &temperatures);
                text.push_str(&output::json(&json, oils.len() == 1)?);
            }
            OilFormat::Csv => text.push_str(&report::oil_points_csv(oil, &temperatures, at == 0)),
            OilFormat::Text => {
                if at > 0 {
                    text.push('\n');
                }
                let units = output::units(args.units).unwrap_or_default();
                let document = report::oil_points(oil, &temperatures, units);
                text.push_str(&report::text(&document, output::look(look)));
            }
        }
    }
    output::put(&text)?;
    Ok(DONE)
}

fn wrong(message: &str) -> Result<u8> {
    tell!("{message}");
    Ok(WRONG)
}

/// The oils meant. Data-sheet figures go through a case file, so that they are read and refused just
/// as there.
fn oils(args: &OilArgs) -> Result<Vec<Oil>, Trouble> {
    if let Some(name) = &args.class {
        let Some(class) = Class::named(name) else {
            let known: Vec<&str> = Class::all().iter().map(Class::id).collect();
            return Err(Trouble::Wrong(format!(
                "no class `{name}` is built in\n\ntry: one of {}",
                known.join(", ")
            )));
        };
        return Oil::from_class(class, &BandPolicy::default())
            .map(|oil| vec![oil])
            .map_err(|error| Trouble::Wrong(error.to_string()));
    }
    if let Some(path) = &args.file {
        return assess::case(path, &[]).map(|case| case.oils);
    }
    let frame = "format = 1\nsite.minimum_temperature = \"0 °C\"\npump.kind = \"vane\"\n\
                 reservoir.oil_volume = \"100 L\"\nduty.time_to_warm = \"1 h\"\n";
    let mut file = CaseFile::read("--viscosity", frame);
    let mut set = |key: &str, value: &str| {
        file.set(key, value)
            .map_err(|fault| Trouble::Wrong(format!("--viscosity: {}", fault.message)))
    };
    for point in &args.viscosity {
        let Some((at, viscosity)) = point.split_once('=') else {
            return Err(Trouble::Wrong(format!(
                "--viscosity: `{point}` has no `=`; write for example \"40 °C=46 mm²/s\""
            )));
        };
        set(&format!("oil[1].viscosity.{}", at.trim()), viscosity)?;
    }
    for (key, value) in
        [("base", &args.base), ("pour_point", &args.pour_point), ("density", &args.density)]
    {
        if let Some(value) = value {
            set(&format!("oil[1].{key}"), value)?;
        }
    }
    file.check().map(|case| case.oils).map_err(|faults| {
        let lines: Vec<String> = faults
            .0
            .iter()
            .map(|fault| format!("{}: {}", fault.key.replace("oil[1].", "--"), fault.message))
            .collect();
        Trouble::Wrong(lines.join("\n"))
    })
}

/// `-40..100 °C by 10`, or one temperature.
fn temperatures(text: &str) -> Result<Vec<f64>, String> {
    let Some((from, rest)) = text.split_once("..") else {
        return text
            .parse::<Temperature>()
            .map(|t| vec![t.as_celsius()])
            .map_err(|e| e.to_string());
    };
    let (to, step) = match rest.split_once(" by ") {
        Some((to, step)) => (to.trim(), Some(step.trim())),
        None => (rest.trim(), None),
    };
    let upper: Temperature = to.parse().map_err(|e| format!("{e}"))?;
    // The unit stands once, behind the range; the step may leave it out too.
    let unit = to.trim_start_matches(|c: char| c.is_ascii_digit() || "+-−–., ".contains(c));
    let with_unit = |part: &str| {
        if part.ends_with(|c: char| c.is_ascii_digit() || c == '.') {
            format!("{part} {unit}")
        } else {
            part.to_owned()
        }
    };
    let lower: Temperature = with_unit(from.trim()).parse().map_err(|e| format!("{e}"))?;
    let step = match step {
        Some(step) => {
            with_unit(step).parse::<TemperatureDifference>().map_err(|e| e.to_string())?.value()
        }
        None => 10.0,
    };
    if step <= 0.0 {
        return Err(format!("the step must be more than 0 K, but is {step} K"));
    }
    let (lower, upper) = (lower.as_celsius(), upper.as_celsius());
    if upper < lower {
        return Err(format!("`{text}` runs downwards; write the colder temperature first"));
    }
    let count = ((upper - lower) / step + 1e-9).floor();
    if count > 100_000.0 {
        return Err(format!("`{text}` has more than 100 000 temperatures"));
    }
    // Counted, not added up: no rounding builds up.
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "0 to 100 000")]
    let count = count as u32;
    Ok((0..=count).map(|n| lower + f64::from(n) * step).collect())
}
