//! Which of a few oils starts a machine, and from which temperature: the library in thirty lines.
//!
//! `cargo run --example which_oil`

use coldsump::advice;
use coldsump::case::{CaseFile, Faults};

/// One line an oil: name, start floor, verdict.
///
/// # Errors
/// Everything that is wrong with the case.
pub(crate) fn table(text: &str) -> Result<Vec<String>, Faults> {
    let case = CaseFile::read("loader", text).check()?;
    Ok(case
        .oils
        .iter()
        .map(|oil| {
            let found = advice::assess(&case, oil);
            match found.start_floor.at_c {
                Some(floor) => format!("{}: {floor:.1} °C, {}", oil.name(), found.verdict.words()),
                None => format!("{}: never, {}", oil.name(), found.verdict.words()),
            }
        })
        .collect())
}

#[allow(dead_code, reason = "the tests use the function alone")]
fn main() -> Result<(), Faults> {
    for line in table(include_str!("skarn-loader.toml"))? {
        println!("{line}");
    }
    Ok(())
}
