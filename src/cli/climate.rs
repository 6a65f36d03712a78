//! `coldsump climate`, and the climate files a case may name.

use super::args::{ClimateCommand, ClimateFromArgs, LookArgs, UnitArg};
use super::assess::Trouble;
use super::{DONE, WRONG, output};
use anyhow::{Context, Result};
use coldsump::climate::records::{Import, Options, Unit};
use coldsump::climate::{BuiltIn, Site, Sites};
use coldsump::report;
use std::path::{Path, PathBuf};

/// Climate files beside a case and in `climates/`, then the built-in sites.
pub(crate) struct Folders(Vec<PathBuf>);

impl Folders {
    /// For a case file; for standard input the current folder.
    pub(crate) fn of(case: &Path) -> Self {
        let mut folders = Vec::new();
        if let Some(folder) = case.parent().filter(|_| case != Path::new("-")) {
            let folder = if folder.as_os_str().is_empty() { Path::new(".") } else { folder };
            folders.extend([
                folder.to_path_buf(),
                folder.join("climates"),
                folder.join("..").join("climates"),
            ]);
        }
        folders.push(PathBuf::from("climates"));
        Self(folders)
    }
}

impl Sites for Folders {
    fn site(&self, name: &str) -> Result<Option<Site>, String> {
        let named = Path::new(name);
        let mut paths = Vec::new();
        if named.extension().is_some_and(|end| end == "toml") {
            paths.push(named.to_path_buf());
            paths.extend(self.0.iter().map(|folder| folder.join(named)));
        } else if named.components().count() == 1 {
            paths.extend(self.0.iter().map(|folder| folder.join(format!("{name}.toml"))));
        }
        for path in paths.iter().filter(|path| path.is_file()) {
            let text = std::fs::read_to_string(path)
                .map_err(|error| format!("cannot read {}: {error}", path.display()))?;
            match Site::read(&path.display().to_string(), &text) {
                Ok(site) => return Ok(Some(site)),
                // A case file may stand under the same name beside the case.
                Err(_) if text.contains("[pump]") => {}
                Err(error) => return Err(error.to_string()),
            }
        }
        BuiltIn.site(name)
    }
}

pub(crate) fn run(command: &ClimateCommand, look: &LookArgs) -> Result<u8> {
    match command {
        ClimateCommand::List => list(look),
        ClimateCommand::From(args) => from(args),
        ClimateCommand::Show(args) => {
            let sites = Folders::of(Path::new("./x"));
            match sites.site(&args.name) {
                Ok(Some(site)) => {
                    let units = output::units(args.units).unwrap_or_default();
                    let marks = match args.case.as_deref().map(marks) {
                        None => Vec::new(),
                        Some(Ok(marks)) => marks,
                        Some(Err(Trouble::Wrong(message))) => {
                            tell!("{message}");
                            return Ok(WRONG);
                        }
                        Some(Err(Trouble::Io(error))) => return Err(error),
                    };
                    let document = report::climate(&site, &marks, units);
                    output::put(&report::text(&document, output::look(look)))?;
                    Ok(DONE)
                }
                Ok(None) => {
                    tell!("no climate `{}` is at hand\n\ntry: coldsump climate list", args.name);
                    Ok(WRONG)
                }
                Err(message) => {
                    tell!("{message}");
                    Ok(WRONG)
                }
            }
        }
    }
}

/// What of a case is marked: its minimum, and the start floors of its oils.
fn marks(path: &Path) -> Result<Vec<(String, f64)>, Trouble> {
    let case = super::advise::case(path, &[], &[])?;
    let decision = coldsump::advice::decide(&case);
    let mut marks = vec![("minimum".to_owned(), case.site.minimum.as_celsius())];
    marks.extend(case.oils.iter().zip(&decision.oils).filter_map(|(oil, found)| {
        Some((oil.name().chars().take(9).collect(), found.start_floor.at_c?))
    }));
    Ok(marks)
}

/// The built-in sites, and those in `climates/` here.
fn list(look: &LookArgs) -> Result<u8> {
    let mut sites: Vec<Site> = BuiltIn::all().to_vec();
    let mut code = DONE;
    let mut files: Vec<PathBuf> = std::fs::read_dir("climates")
        .map(|entries| entries.filter_map(|entry| Some(entry.ok()?.path())).collect())
        .unwrap_or_default();
    files.sort();
    for path in files.iter().filter(|path| path.extension().is_some_and(|end| end == "toml")) {
        let read = std::fs::read_to_string(path)
            .map_err(|error| format!("cannot read {}: {error}", path.display()))
            .and_then(|text| {
                Site::read(&path.display().to_string(), &text).map_err(|error| error.to_string())
            });
        match read {
            Ok(site) if sites.iter().any(|known| known.name == site.name) => {}
            Ok(site) => sites.push(site),
            Err(message) => {
                tell!("{message}");
                code = WRONG;
            }
        }
    }
    output::put(&report::text(&report::climates(&sites), output::look(look)))?;
    Ok(code)
}

/// Records in, a climate file out; what was dropped is said.
fn from(args: &ClimateFromArgs) -> Result<u8> {
    let options = Options {
        utc_offset: args.utc_offset,
        unit: args.units.map(|unit| match unit {
            UnitArg::C => Unit::Celsius,
            UnitArg::F => Unit::Fahrenheit,
        }),
        start_hour: args.start_hour,
    };
    let mut import = Import::new(options.clone());
    for path in &args.records {
        let shown = path.display().to_string();
        let file = std::fs::File::open(path).with_context(|| format!("cannot read {shown}"))?;
        let size = file.metadata().map_or(0, |data| data.len());
        // Drawn on standard error, and only where that is a terminal.
        let bar = indicatif::ProgressBar::new(size);
        bar.set_style(
            indicatif::ProgressStyle::with_template(
                "{msg} {bytes}/{total_bytes} {bytes_per_sec} {eta} left",
            )
            .unwrap_or_else(|_| indicatif::ProgressStyle::default_bar()),
        );
        bar.set_message(shown.clone());
        let (mut read, mut drawn) = (0_u64, 0_u64);
        let found =
            import.file(&shown, std::io::BufReader::with_capacity(1 << 16, file), |bytes| {
                read += bytes;
                if read - drawn > 1 << 20 {
                    bar.set_position(read);
                    drawn = read;
                }
            });
        bar.finish_and_clear();
        match found {
            Ok(layout) => tell!("{shown}: read as {}", layout.words()),
            Err(coldsump::climate::records::RecordError::Io { file, source }) => {
                return Err(source).with_context(|| format!("cannot read {file}"));
            }
            Err(error) => {
                tell!("{error}");
                return Ok(WRONG);
            }
        }
    }
    let stem = args.output.file_stem().map(|stem| stem.to_string_lossy().into_owned());
    let name = args.name.clone().or(stem).unwrap_or_else(|| "site".to_owned());
    let source = args.source.clone().unwrap_or_else(|| {
        let files: Vec<String> = import
            .layouts()
            .iter()
            .map(|(file, layout)| {
                let name =
                    Path::new(file).file_name().map(|name| name.to_string_lossy().into_owned());
                format!("{} ({})", name.unwrap_or_default(), layout.words())
            })
            .collect();
        files.join("; ")
    });
    let (site, cautions) = match import.gathered().site(&name, &options, &source) {
        Ok(done) => done,
        Err(message) => {
            tell!(
                "{}: {message}",
                args.records.first().map_or("-".into(), |p| p.display().to_string())
            );
            return Ok(WRONG);
        }
    };
    let used = import.gathered().used();
    tell!("{} lines, {used} temperatures used", import.lines());
    for (drop, count) in import.dropped() {
        tell!("  {count} dropped: {}", drop.words());
    }
    for caution in &cautions {
        tell!("  mind: {caution}");
    }
    let text = site.write().context("the climate file cannot be written down")?;
    output::write(&args.output, &text, args.force)?;
    tell!(
        "wrote {}\n\ntry: coldsump climate show {}",
        args.output.display(),
        args.output.display()
    );
    Ok(DONE)
}
