//! What is handed out: licences of what is built in, what the package holds, the manual page.
#![cfg(feature = "cli")]

use serde_json::Value;
use std::collections::{BTreeMap, BTreeSet};
use std::process::Command;

fn cargo(args: &[&str]) -> String {
    let output = Command::new(env!("CARGO"))
        .args(args)
        .current_dir(env!("CARGO_MANIFEST_DIR"))
        .output()
        .unwrap();
    assert!(output.status.success(), "{}", String::from_utf8_lossy(&output.stderr));
    String::from_utf8(output.stdout).unwrap()
}

fn host() -> String {
    let output = Command::new("rustc").arg("-vV").output().unwrap();
    let text = String::from_utf8(output.stdout).unwrap();
    text.lines().find_map(|line| line.strip_prefix("host: ")).unwrap().to_owned()
}

/// What is built into the program for this platform: the normal dependencies, all the way down.
fn built_in() -> Vec<Value> {
    let platform = host();
    let args = [
        "metadata",
        "--locked",
        "--offline",
        "--format-version",
        "1",
        "--filter-platform",
        &platform,
    ];
    let all: Value = serde_json::from_str(&cargo(&args)).unwrap();
    let nodes: BTreeMap<&str, &Value> = all["resolve"]["nodes"]
        .as_array()
        .unwrap()
        .iter()
        .map(|node| (node["id"].as_str().unwrap(), node))
        .collect();
    let mut open = vec![all["resolve"]["root"].as_str().unwrap()];
    let mut seen = BTreeSet::new();
    while let Some(id) = open.pop() {
        if !seen.insert(id) {
            continue;
        }
        for dependency in nodes[id]["deps"].as_array().unwrap() {
            let kinds = dependency["dep_kinds"].as_array().unwrap();
            if kinds.iter().any(|kind| kind["kind"].is_null()) {
                open.push(dependency["pkg"].as_str().unwrap());
            }
        }
    }
    let packages = all["packages"].as_array().unwrap();
    packages.iter().filter(|one| seen.contains(one["id"].as_str().unwrap())).cloned().collect()
}

/// Licences that may stand beside MIT or Apache-2.0.
const ALLOWED: &[&str] = &[
    "MIT",
    "Apache-2.0",
    "BSD-2-Clause",
    "BSD-3-Clause",
    "Zlib",
    "Unlicense",
    "Unicode-3.0",
    "MIT-0",
    "BSL-1.0",
];

#[test]
fn licences_of_what_is_built_in_may_be_passed_on() {
    let packages = built_in();
    assert!(packages.len() > 30, "only {} packages", packages.len());
    for package in &packages {
        let name = &package["name"];
        let licence = package["license"].as_str().unwrap_or_else(|| panic!("{name}: no licence"));
        // An expression of alternatives, all parts of which must be met by one that is allowed.
        for part in licence.replace('/', " OR ").split(" AND ") {
            let met = part
                .trim_matches(|c| c == '(' || c == ')')
                .split(" OR ")
                .any(|one| ALLOWED.contains(&one.trim()));
            assert!(met, "{name}: {licence}");
        }
    }
}

#[test]
fn nothing_is_built_in_twice() {
    let mut versions: BTreeMap<String, Vec<String>> = BTreeMap::new();
    for package in built_in() {
        let text = |key: &str| package[key].as_str().unwrap().to_owned();
        versions.entry(text("name")).or_default().push(text("version"));
    }
    versions.retain(|_, versions| versions.len() > 1);
    // Derives of others run on two generations of one parser while compiling; neither is in the program.
    versions.remove("syn");
    assert!(versions.is_empty(), "{versions:?}");
}

#[test]
fn the_package_holds_what_is_needed_and_no_more() {
    let list = cargo(&["package", "--locked", "--offline", "--list", "--allow-dirty"]);
    for needed in [
        "Cargo.lock",
        "LICENSE",
        "README.md",
        "DEVELOPERS.md",
        "src/main.rs",
        "src/oil/classes.toml",
        "climates/valdez-coast.toml",
        "examples/skarn-loader.toml",
        "src/report/advice.schema.json",
    ] {
        assert!(list.lines().any(|line| line == needed), "{needed} is not packed");
    }
    assert!(
        !list.lines().any(|line| line.starts_with("tests/") || line.starts_with(".ci")),
        "{list}"
    );
}

#[test]
fn every_command_has_a_manual_page() {
    let run = |args: &[&str]| {
        let output = Command::new(env!("CARGO_BIN_EXE_coldsump")).args(args).output().unwrap();
        (output.status.code(), String::from_utf8(output.stdout).unwrap())
    };
    let (code, page) = run(&["man"]);
    assert_eq!(code, Some(0));
    assert!(page.contains(".TH coldsump 1"), "{page}");
    let named: Vec<&str> = page
        .lines()
        .filter_map(|line| line.strip_prefix("coldsump\\-")?.strip_suffix("(1)"))
        .collect();
    assert!(named.len() >= 9, "{named:?}");
    for name in named.into_iter().filter(|name| *name != "help") {
        let (code, page) = run(&["man", name]);
        assert_eq!(code, Some(0), "{name}");
        assert!(page.contains(&format!(".TH coldsump-{name} 1")), "{name}: {page}");
        assert!(page.contains(".SH OPTIONS"), "{name}");
    }
    assert_eq!(run(&["man", "nothing"]).0, Some(2));
}
