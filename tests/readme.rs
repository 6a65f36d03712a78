//! The README says what the program does. `UPDATE=1 cargo test --test readme` writes the parts that
//! are made from code.
#![cfg(feature = "cli")]

use coldsump::case::CaseFile;
use coldsump::{advice, report};

const START: &str = "<!-- keys: made from the key table -->\n";
const END: &str = "<!-- end of keys -->";

#[test]
fn the_keys_are_those_of_the_key_table() {
    let readme = std::fs::read_to_string("README.md").unwrap();
    let (before, rest) = readme.split_once(START).unwrap();
    let (held, after) = rest.split_once(END).unwrap();
    let wanted = format!("{}\n", report::key_list());
    if std::env::var_os("UPDATE").is_some() {
        std::fs::write("README.md", format!("{before}{START}{wanted}{END}{after}")).unwrap();
        return;
    }
    assert_eq!(held, wanted, "run `UPDATE=1 cargo test --test readme`");
}

#[test]
fn the_excerpt_is_what_the_program_prints() {
    let readme = std::fs::read_to_string("README.md").unwrap();
    let held = readme.split_once("$ coldsump advise examples/hollow-skid.toml\n").unwrap().1;
    let held = held.split_once("\n  ...").unwrap().0;
    let text = std::fs::read_to_string("examples/hollow-skid.toml").unwrap();
    let case = CaseFile::read("hollow-skid", &text).check().unwrap();
    let document = report::advice(&case, &advice::advise(&case), case.units);
    let printed = report::text(&document, report::Look::default());
    if std::env::var_os("UPDATE").is_some() {
        let count = held.lines().count();
        let fresh: Vec<&str> = printed.lines().take(count).collect();
        std::fs::write("README.md", readme.replacen(held, fresh.join("\n").trim_end(), 1)).unwrap();
        return;
    }
    assert!(printed.starts_with(held), "README:\n{held}\n\nprinted:\n{printed}");
    assert!(held.lines().count() > 15);
}

#[test]
fn the_case_in_it_is_a_case() {
    let readme = std::fs::read_to_string("README.md").unwrap();
    let case = readme.split_once("```toml\n").unwrap().1.split_once("```").unwrap().0;
    let case =
        CaseFile::read("README.md", case).check().unwrap_or_else(|faults| panic!("{faults}"));
    assert!(advice::decide(&case).starts());
}
