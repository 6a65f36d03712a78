//! `coldsump climate`, and the climate files a case may name.

use super::args::{ClimateCommand, LookArgs};
use super::{DONE, WRONG, output};
use anyhow::Result;
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
        ClimateCommand::Show(args) => {
            let sites = Folders::of(Path::new("./x"));
            match sites.site(&args.name) {
                Ok(Some(site)) => {
                    let units = output::units(args.units).unwrap_or_default();
                    let document = report::climate(&site, units);
                    output::put(&report::text(&document, output::look(look)))?;
                    Ok(DONE)
                }
                Ok(None) => {
                    eprintln!(
                        "no climate `{}` is at hand\n\ntry: coldsump climate list",
                        args.name
                    );
                    Ok(WRONG)
                }
                Err(message) => {
                    eprintln!("{message}");
                    Ok(WRONG)
                }
            }
        }
    }
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
                eprintln!("{message}");
                code = WRONG;
            }
        }
    }
    output::put(&report::text(&report::climates(&sites), output::look(look)))?;
    Ok(code)
}
