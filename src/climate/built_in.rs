//! Sites the crate carries: design classes, two observed places, the invented demo sites.

use super::site::Site;
use std::sync::LazyLock;

/// Where a case's climate is looked up by name.
pub trait Sites {
    /// The site of a name.
    ///
    /// # Errors
    /// There is a file of that name, and it is wrong: what is wrong with it.
    fn site(&self, name: &str) -> Result<Option<Site>, String>;
}

/// What the crate carries.
#[derive(Debug, Clone, Copy)]
pub struct BuiltIn;

/// (file, text), in the order in which they are listed.
static TEXTS: &[(&str, &str)] = &[
    ("C0", include_str!("classes/C0.toml")),
    ("C1", include_str!("classes/C1.toml")),
    ("C2", include_str!("classes/C2.toml")),
    ("C3", include_str!("classes/C3.toml")),
    ("C4", include_str!("classes/C4.toml")),
    ("valdez-coast", include_str!("../../climates/valdez-coast.toml")),
    ("northway-interior", include_str!("../../climates/northway-interior.toml")),
    ("skarn-ridge", include_str!("../../climates/skarn-ridge.toml")),
    ("hollow-pit", include_str!("../../climates/hollow-pit.toml")),
    ("north-bench", include_str!("../../climates/north-bench.toml")),
    ("tarn-landing", include_str!("../../climates/tarn-landing.toml")),
];

/// A file that did not read would be missing here, which a test rules out.
static SITES: LazyLock<Vec<Site>> =
    LazyLock::new(|| TEXTS.iter().filter_map(|(file, text)| Site::read(file, text).ok()).collect());

impl BuiltIn {
    /// All of them.
    #[must_use]
    pub fn all() -> &'static [Site] {
        &SITES
    }
}

impl Sites for BuiltIn {
    fn site(&self, name: &str) -> Result<Option<Site>, String> {
        Ok(SITES.iter().find(|site| site.name.eq_ignore_ascii_case(name.trim())).cloned())
    }
}

#[cfg(test)]
mod tests {
    use super::{SITES, Site, TEXTS};

    #[test]
    fn every_file_reads_under_its_name() {
        for (file, text) in TEXTS {
            let site = Site::read(file, text).unwrap_or_else(|error| panic!("{error}"));
            assert_eq!(site.name, *file);
            assert!(site.usual_minimum().is_some(), "{file}");
        }
        assert_eq!(SITES.len(), TEXTS.len());
    }
}
