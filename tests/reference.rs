//! Single figures against general-purpose libraries (`tests/reference/values.py`), and the whole
//! assessment against a second implementation in Python on them (`tests/reference/reference.py`):
//! floors within 0.05 K, powers within 0.5 %. Versions are in the stored results.
//!
//! The table of deviations in the README is made here: `UPDATE=1 cargo test --test reference`.
#![cfg(feature = "cli")]

use coldsump::advice::{self, HeatingStatus};
use coldsump::case::CaseFile;
use coldsump::report;
use serde_json::Value;

#[path = "reference/values.rs"]
mod values;

use values::{Deviations, Scale};

/// One comparison: where, found here, found there.
struct Pair {
    place: String,
    found: Value,
    want: Value,
}

/// Deviations met, by kind.
#[derive(Default)]
struct Spread {
    kelvin: Vec<f64>,
    share: Vec<f64>,
    wrong: Vec<String>,
}

impl Spread {
    fn take(&mut self, pair: &Pair) {
        let Pair { place, found, want } = pair;
        match (found.as_f64(), want.as_f64()) {
            (Some(a), Some(b)) if place.ends_with("_c") => {
                self.kelvin.push((a - b).abs());
                // Skins are where the film is steepest: 0.5 K, as of the published check values.
                let allowed = if place.contains("skin") { 0.5 } else { 0.05 };
                if (a - b).abs() > allowed {
                    self.wrong.push(format!("{place}: {a} here, {b} there"));
                }
            }
            (Some(a), Some(b)) => {
                let share = (a - b).abs() / b.abs().max(1e-9);
                if b.abs() > 1e-9 {
                    self.share.push(share);
                }
                if share > 0.005 && (a - b).abs() > 1e-6 {
                    self.wrong.push(format!("{place}: {a} here, {b} there"));
                }
            }
            _ if found == want => {}
            _ => self.wrong.push(format!("{place}: {found} here, {want} there")),
        }
    }
}

fn pairs(out: &mut Vec<Pair>, place: &str, here: &Value, there: &Value) {
    match there {
        Value::Object(map) => {
            for (key, want) in map {
                let at = format!("{place}/{key}");
                // The reference gives skins at the greatest watt density, which is what is used
                // here where an element is sized anew.
                let key = match key.as_str() {
                    "skin_film_at_max_c" => "skin_film_c",
                    "skin_bulk_at_max_c" => "skin_bulk_c",
                    other => other,
                };
                let found = here.get(key).cloned().unwrap_or(Value::Null);
                if key.starts_with("skin_") && found.is_null() {
                    continue;
                }
                pairs(out, &at, &found, want);
            }
        }
        Value::Array(list) if list.iter().all(|item| item.get("limit").is_some()) => {
            for want in list {
                let name = want["limit"].as_str().unwrap();
                let found = here.as_array().unwrap().iter().find(|row| row["limit"] == *name);
                let at = format!("{place}/{name}");
                pairs(out, &at, found.unwrap_or(&Value::Null), want);
            }
        }
        _ => out.push(Pair { place: place.to_owned(), found: here.clone(), want: there.clone() }),
    }
}

fn compare(path: &str) -> (usize, Spread) {
    let text = std::fs::read_to_string(path).unwrap();
    let stored: Value = serde_json::from_str(&text).unwrap();
    let mut spread = Spread::default();
    let mut oils = 0;
    for stored in stored["cases"].as_array().unwrap() {
        let name = stored["name"].as_str().unwrap();
        let file = CaseFile::read(name, stored["toml"].as_str().unwrap());
        let case = file.check().unwrap_or_else(|faults| panic!("{faults}"));
        let found: Vec<_> = case.oils.iter().map(|oil| (oil, advice::assess(&case, oil))).collect();
        let mut json = report::assessment_json(&case, &found);
        for (index, want) in stored["oils"].as_array().unwrap().iter().enumerate() {
            oils += 1;
            let here = &mut json["oils"][index];
            // Circuits and sizes are not in the reference: its `sized` is a needed power.
            let status = found[index].1.heating.status;
            let no_size = found[index].1.heating.whys.iter().any(|why| {
                matches!(
                    why,
                    advice::HeatingWhy::NoHeaterSize | advice::HeatingWhy::SurfaceTooSmall
                )
            });
            if status == HeatingStatus::CircuitTooSmall || no_size {
                here["heating"]["status"] = Value::from("sized");
            }
            let mut all = Vec::new();
            pairs(&mut all, &format!("{name}, oil {index}"), here, want);
            for pair in &all {
                spread.take(pair);
            }
        }
    }
    (oils, spread)
}

#[test]
fn random_cases_agree() {
    let (oils, spread) = compare("tests/reference/random-cases.json");
    assert!(oils >= 150, "{oils} oils");
    let wrong = &spread.wrong;
    assert!(wrong.is_empty(), "{} differ:\n{}", wrong.len(), wrong.join("\n"));
}

#[test]
fn examples_agree() {
    let text = std::fs::read_to_string("tests/reference/examples.json").unwrap();
    let stored: Value = serde_json::from_str(&text).unwrap();
    for case in stored["cases"].as_array().unwrap() {
        let name = case["name"].as_str().unwrap();
        let now = std::fs::read_to_string(name).unwrap();
        assert_eq!(
            now,
            case["toml"].as_str().unwrap(),
            "{name} has changed: make the results anew"
        );
    }
    let (oils, spread) = compare("tests/reference/examples.json");
    assert!(oils >= 5, "{oils} oils");
    assert!(spread.wrong.is_empty(), "{}", spread.wrong.join("\n"));
}

#[test]
fn values_agree() {
    let compared = values::compare();
    let (count, wrong) = (compared.count(), &compared.wrong);
    assert!(count >= 300, "{count} values");
    assert!(wrong.is_empty(), "{} differ:\n{}", wrong.len(), wrong.join("\n"));
}

const START: &str = "<!-- deviations: made from tests/reference -->\n";
const END: &str = "<!-- end of deviations -->";

#[test]
fn the_readme_tells_the_deviations() {
    let compared = values::compare();
    let (count, made) = (compared.count(), &compared.made);
    let mut rows = compared.rows;
    let (oils, spread) = compare("tests/reference/random-cases.json");
    let whole = |what, scale, each| Deviations {
        what,
        against: "second implementation".to_owned(),
        scale,
        each,
    };
    rows.push(whole("whole cases: temperatures", Scale::Kelvin, spread.kelvin));
    rows.push(whole("whole cases: other figures", Scale::Share, spread.share));
    let mut wanted = format!(
        "{count} single values over the whole legal range, and {oils} oils in random cases ({made}):\n\n\
         | figure | values | against | median | worst |\n| --- | --- | --- | --- | --- |\n"
    );
    wanted.extend(rows.iter().map(Deviations::row));

    let readme = std::fs::read_to_string("README.md").unwrap();
    let (before, rest) = readme.split_once(START).unwrap();
    let (held, after) = rest.split_once(END).unwrap();
    if std::env::var_os("UPDATE").is_some() {
        std::fs::write("README.md", format!("{before}{START}{wanted}{END}{after}")).unwrap();
        return;
    }
    assert_eq!(held, wanted, "run `UPDATE=1 cargo test --test reference`");
}
