//! Every source of every formula, table and default, gathered from the code and its tables. The list
//! in DEVELOPERS.md is made from it: `UPDATE=1 cargo test --test sources`.

use std::collections::{BTreeMap, BTreeSet};
use std::fs;
use std::path::{Path, PathBuf};

/// One use of a source.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord)]
struct Use {
    cite: String,
    read: String,
    what: String,
    file: String,
}

fn files(folder: &str) -> Vec<PathBuf> {
    let mut found = Vec::new();
    let mut open = vec![PathBuf::from(folder)];
    while let Some(folder) = open.pop() {
        for entry in fs::read_dir(folder).unwrap() {
            let path = entry.unwrap().path();
            if path.is_dir() { open.push(path) } else { found.push(path) }
        }
    }
    found.sort();
    found
}

/// The string literal that opens after `text`'s first quotation mark.
fn literal(text: &str) -> Option<&str> {
    let from = text.find('"')? + 1;
    Some(&text[from..from + text[from..].find('"')?])
}

/// `Source::publication("...")` and its like, with the `name` or `about` that stands over it.
fn in_code(path: &Path, text: &str) -> Vec<Use> {
    let reads = [
        ("publication", "publication"),
        ("quoted", "quoted"),
        ("memory", "memory"),
        ("common_practice", "common practice"),
        ("judgement", "judgement"),
    ];
    let mut uses = Vec::new();
    for (call, read) in reads {
        let call = format!("Source::{call}(");
        for (at, _) in text.match_indices(&call) {
            let before = &text[..at];
            let what = ["name: ", "about: "]
                .iter()
                .filter_map(|key| before.rfind(key))
                .max()
                .and_then(|from| literal(&before[from..]))
                .unwrap_or_else(|| panic!("{}: a source over nothing", path.display()));
            uses.push(Use {
                cite: literal(&text[at..]).unwrap().to_owned(),
                read: read.to_owned(),
                what: what.to_owned(),
                file: path.display().to_string(),
            });
        }
    }
    uses
}

/// Every table with a `source` in a data file, by the name of its row.
fn in_table(path: &Path, table: &toml::Table, uses: &mut Vec<Use>) {
    let text = |key: &str| table.get(key).and_then(toml::Value::as_str);
    if let Some(cite) = text("source") {
        let row = ["id", "name", "title"].iter().find_map(|key| text(key)).unwrap_or("table");
        let room = path.file_stem().unwrap().to_string_lossy().replace('_', " ");
        uses.push(Use {
            cite: cite.to_owned(),
            read: match text("kind") {
                Some("invented") => "invented".to_owned(),
                _ => text("read").unwrap_or("publication").replace('-', " "),
            },
            what: if row == room { format!("climate {row}") } else { format!("{room}: {row}") },
            file: path.display().to_string(),
        });
    }
    for value in table.values() {
        match value {
            toml::Value::Table(inner) => in_table(path, inner, uses),
            toml::Value::Array(rows) => {
                rows.iter()
                    .filter_map(toml::Value::as_table)
                    .for_each(|row| in_table(path, row, uses));
            }
            _ => {}
        }
    }
}

fn all() -> Vec<Use> {
    let mut uses = Vec::new();
    for path in files("src").into_iter().chain(files("climates")) {
        let text = fs::read_to_string(&path).unwrap();
        match path.extension().and_then(|end| end.to_str()) {
            Some("rs") if !path.ends_with("source.rs") => uses.extend(in_code(&path, &text)),
            Some("toml") => in_table(&path, &text.parse().unwrap(), &mut uses),
            _ => {}
        }
    }
    uses.sort();
    uses.dedup();
    uses
}

/// What is taken from each source, in as few words as the rows allow.
fn rows(uses: &[Use], reads: &[&str]) -> String {
    let mut by_source: BTreeMap<(&str, &str), BTreeSet<String>> = BTreeMap::new();
    for one in uses.iter().filter(|one| reads.contains(&one.read.as_str())) {
        by_source.entry((&one.cite, &one.read)).or_default().insert(one.what.replace('|', "/"));
    }
    let mut text = String::from("| source | read as | taken from it |\n|---|---|---|\n");
    for ((cite, read), what) in by_source {
        // Rows of one table are named together.
        let mut tables: BTreeMap<&str, Vec<&str>> = BTreeMap::new();
        for one in &what {
            let (table, row) = one.split_once(": ").unwrap_or((one, ""));
            tables.entry(table).or_default().push(row);
        }
        let what: Vec<String> = tables
            .into_iter()
            .map(|(table, rows)| match rows.as_slice() {
                [""] => table.to_owned(),
                rows => format!("{table}: {}", rows.join(", ")),
            })
            .collect();
        text += &format!("| {} | {read} | {} |\n", cite.replace('|', "/"), what.join("; "));
    }
    text
}

fn held_in(page: &str, start: &str, end: &str, wanted: &str) {
    let held = fs::read_to_string(page).unwrap();
    let (before, rest) = held.split_once(start).unwrap();
    let (part, after) = rest.split_once(end).unwrap();
    if std::env::var_os("UPDATE").is_some() {
        fs::write(page, format!("{before}{start}{wanted}{end}{after}")).unwrap();
        return;
    }
    assert_eq!(part, wanted, "run `UPDATE=1 cargo test --test sources -- --test-threads=1`");
}

#[test]
fn the_page_lists_every_source() {
    let uses = all();
    assert!(uses.len() > 150, "only {} uses: is the search broken?", uses.len());
    for one in &uses {
        assert!(!one.cite.trim().is_empty() && !one.what.trim().is_empty(), "{one:?}");
        let known = ["publication", "quoted", "memory", "common practice", "judgement", "invented"];
        assert!(known.contains(&one.read.as_str()), "{one:?}");
    }
    held_in(
        "DEVELOPERS.md",
        "<!-- sources: made from the code -->\n",
        "<!-- end of sources -->",
        &rows(&uses, &["publication", "quoted"]),
    );
    held_in(
        "DEVELOPERS.md",
        "<!-- recalled: made from the code -->\n",
        "<!-- end of recalled -->",
        &rows(&uses, &["memory"]),
    );
}

#[test]
fn tables_name_their_source() {
    // Data tables beside their owner: each list of rows, or the file, names one.
    for path in files("src").iter().filter(|path| path.extension().is_some_and(|end| end == "toml"))
    {
        let table: toml::Table = fs::read_to_string(path).unwrap().parse().unwrap();
        let whole = table.contains_key("source");
        for (name, value) in &table {
            let Some(rows) = value.as_array() else { continue };
            for row in rows.iter().filter_map(toml::Value::as_table) {
                assert!(whole || row.contains_key("source"), "{}: {name} {row:?}", path.display());
            }
        }
    }
}
