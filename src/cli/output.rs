//! Standard output, colour, and files read.

use super::args::{ColorWhen, LookArgs, UnitsArg};
use anyhow::{Context, Result};
use coldsump::case::Units;
use coldsump::report::Look;
use std::io::{IsTerminal, Read, Write};
use std::path::Path;

/// The look of standard output: the option, then `NO_COLOR`, `CLICOLOR_FORCE`, `CLICOLOR=0`,
/// `TERM=dumb`, then whether it is a terminal.
pub(crate) fn look(args: &LookArgs) -> Look {
    let var = |name: &str| std::env::var(name).ok();
    let color = color(args.color, var, std::io::stdout().is_terminal());
    Look { color, ascii: args.ascii, width: 80 }
}

fn color(when: ColorWhen, var: impl Fn(&str) -> Option<String>, terminal: bool) -> bool {
    let set = |name: &str| var(name).is_some_and(|value| !value.is_empty());
    match when {
        ColorWhen::Always => true,
        ColorWhen::Never => false,
        ColorWhen::Auto if set("NO_COLOR") => false,
        ColorWhen::Auto if var("CLICOLOR_FORCE").is_some_and(|v| !v.is_empty() && v != "0") => true,
        ColorWhen::Auto if var("CLICOLOR").is_some_and(|v| v == "0") => false,
        ColorWhen::Auto if var("TERM").is_some_and(|v| v == "dumb") => false,
        ColorWhen::Auto => terminal,
    }
}

pub(crate) fn units(arg: Option<UnitsArg>) -> Option<Units> {
    arg.map(|units| match units {
        UnitsArg::Metric => Units::Metric,
        UnitsArg::Us => Units::Us,
    })
}

/// JSON as a line, or laid out where it stands alone. No control character is left in it: those
/// over U+007E are legal in JSON, but a terminal may obey them.
pub(crate) fn json(value: &serde_json::Value, alone: bool) -> Result<String> {
    let text =
        if alone { serde_json::to_string_pretty(value)? } else { serde_json::to_string(value)? };
    let mut safe = String::with_capacity(text.len() + 1);
    for c in text.chars() {
        if c.is_control() && c != '\n' {
            safe.push_str(&format!("\\u{:04x}", u32::from(c)));
        } else {
            safe.push(c);
        }
    }
    safe.push('\n');
    Ok(safe)
}

/// Writes to standard output.
pub(crate) fn put(text: &str) -> Result<()> {
    let mut out = std::io::stdout().lock();
    out.write_all(text.as_bytes())?;
    out.flush()?;
    Ok(())
}

/// Writes a file, whole or not at all: a new one beside it, then renamed. A link stays a link, a
/// file that may not be written stays as it is, and a device or pipe is written to directly.
pub(crate) fn write(path: &Path, text: &str, force: bool) -> Result<()> {
    let shown = path.display().to_string();
    let linked = path.symlink_metadata().is_ok_and(|there| there.is_symlink());
    let there = path.metadata().ok();
    if there.as_ref().is_some_and(|there| there.is_dir()) {
        anyhow::bail!("{shown} is a folder\n\ntry: a file name in it");
    }
    if there.as_ref().is_some_and(|there| !there.is_file()) {
        return std::fs::OpenOptions::new()
            .write(true)
            .open(path)
            .and_then(|mut device| device.write_all(text.as_bytes()))
            .with_context(|| format!("cannot write {shown}"));
    }
    if !force && (there.is_some() || linked) {
        anyhow::bail!("{shown} is there already\n\ntry: --force, or another name");
    }
    if there.is_some_and(|there| there.permissions().readonly()) {
        anyhow::bail!("{shown} is write-protected\n\ntry: another name");
    }
    let target = if linked {
        std::fs::canonicalize(path).with_context(|| format!("{shown} links to nothing"))?
    } else {
        path.to_path_buf()
    };
    let path = target.as_path();
    let folder = match path.parent() {
        Some(folder) if !folder.as_os_str().is_empty() => folder,
        _ => Path::new("."),
    };
    let mut name = std::ffi::OsString::from(".");
    name.push(path.file_name().with_context(|| format!("{shown} names no file"))?);
    name.push(format!(".{}.part", std::process::id()));
    let part = folder.join(name);
    let done = std::fs::File::create(&part)
        .and_then(|mut file| {
            file.write_all(text.as_bytes())?;
            file.sync_all()
        })
        .and_then(|()| std::fs::rename(&part, path));
    if done.is_err() {
        // Nothing half-written stays; that the part may not be there is no further trouble.
        let _ = std::fs::remove_file(&part);
    }
    done.with_context(|| format!("cannot write {shown}"))
}

/// The text of a file and the name messages call it by; `-` is standard input.
pub(crate) fn read(path: &Path) -> Result<(String, String)> {
    let (name, bytes) = if path == Path::new("-") {
        let mut bytes = Vec::new();
        std::io::stdin().read_to_end(&mut bytes).context("cannot read standard input")?;
        ("standard input".to_owned(), bytes)
    } else {
        let name = path.display().to_string();
        let bytes = std::fs::read(path).with_context(|| format!("cannot read {name}"))?;
        (name, bytes)
    };
    let text = String::from_utf8(bytes)
        .map_err(|error| error.utf8_error())
        .with_context(|| format!("{name} is not UTF-8 text"))?;
    Ok((name, text))
}

#[cfg(test)]
mod tests {
    use super::{ColorWhen, color};

    #[test]
    fn colour_follows_its_order() {
        // (option, variables, terminal, colour)
        type Row<'a> = (ColorWhen, &'a [(&'a str, &'a str)], bool, bool);
        let rows: &[Row<'_>] = &[
            (ColorWhen::Auto, &[], true, true),
            (ColorWhen::Auto, &[], false, false),
            (ColorWhen::Auto, &[("NO_COLOR", "1")], true, false),
            (ColorWhen::Auto, &[("NO_COLOR", "")], true, true),
            (ColorWhen::Auto, &[("NO_COLOR", "1"), ("CLICOLOR_FORCE", "1")], false, false),
            (ColorWhen::Auto, &[("CLICOLOR_FORCE", "1")], false, true),
            (ColorWhen::Auto, &[("CLICOLOR_FORCE", "0")], false, false),
            (ColorWhen::Auto, &[("CLICOLOR", "0")], true, false),
            (ColorWhen::Auto, &[("TERM", "dumb")], true, false),
            (ColorWhen::Always, &[("NO_COLOR", "1")], false, true),
            (ColorWhen::Never, &[("CLICOLOR_FORCE", "1")], true, false),
        ];
        for (when, vars, terminal, want) in rows {
            let var = |name: &str| {
                vars.iter().find(|(key, _)| *key == name).map(|(_, value)| (*value).to_owned())
            };
            assert_eq!(color(*when, var, *terminal), *want, "{when:?} {vars:?} {terminal}");
        }
    }
}
