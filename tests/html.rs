//! The page: figures with their pointers, rounding to the safe side, text from a case that means harm,
//! and, where Chromium is installed, one printed page for the card.
#![cfg(feature = "cli")]

use coldsump::advice;
use coldsump::case::{Case, CaseFile, Units};
use coldsump::report;
use serde_json::Value;
use std::path::{Path, PathBuf};
use std::process::Command;

fn examples() -> Vec<(String, Case)> {
    let mut found: Vec<(String, Case)> = std::fs::read_dir("examples")
        .unwrap()
        .map(|entry| entry.unwrap().path())
        .filter(|path| path.extension().is_some_and(|end| end == "toml"))
        .map(|path| {
            let name = path.file_stem().unwrap().to_string_lossy().into_owned();
            let text = std::fs::read_to_string(&path).unwrap();
            (name.clone(), CaseFile::read(&name, &text).check().unwrap())
        })
        .collect();
    found.sort_by(|a, b| a.0.cmp(&b.0));
    found
}

/// The first number in a text.
fn number(text: &str) -> Option<f64> {
    let from = text.find(|c: char| c.is_ascii_digit() || c == '-')?;
    let rest = &text[from..];
    let to = rest
        .char_indices()
        .find(|(at, c)| !(c.is_ascii_digit() || *c == '.' || (*at == 0 && *c == '-')))
        .map_or(rest.len(), |(at, _)| at);
    rest[..to].parse().ok()
}

#[test]
fn the_card_rounds_to_the_safe_side() {
    for (name, case) in examples() {
        let advice = advice::advise(&case);
        let json = report::advice_json(&case, &advice);
        for units in [Units::Metric, Units::Us] {
            let card = report::card(&case, &advice, units);
            let mut compared = 0;
            for span in report::card_lines(&card).into_iter().flat_map(|line| &line.0) {
                let Some(pointer) = &span.pointer else { continue };
                let value = json.pointer(pointer).unwrap_or_else(|| panic!("{name}: {pointer}"));
                let Some(value) = value.as_f64() else { continue };
                let Some(shown) = number(&span.text) else { continue };
                let celsius = |t: f64| if units == Units::Us { t * 1.8 + 32.0 } else { t };
                let least = pointer.ends_with("_floor_c")
                    || pointer.ends_with("at_least_c")
                    || pointer.ends_with("minimum_c");
                if least {
                    let value = celsius(value);
                    assert!(
                        shown >= value - 1e-3 && shown < value + 1.0,
                        "{name}: {} for {value}",
                        span.text
                    );
                } else if pointer.ends_with("hot_ceiling_c") {
                    let value = celsius(value);
                    assert!(shown <= value + 1e-3 && shown > value - 1.0, "{name}: {}", span.text);
                } else if pointer.ends_with("at_most_kpa") {
                    let value = if units == Units::Us { value / 3.386_389 } else { value };
                    assert!(shown <= value + 1e-3 && shown > value - 0.51, "{name}: {}", span.text);
                } else if pointer.ends_with("at_most_rpm") {
                    assert!(shown <= value + 1e-3 && shown > value - 10.0, "{name}: {}", span.text);
                } else if pointer.ends_with("at_least_s") {
                    assert!(shown >= value - 1e-3, "{name}: {}", span.text);
                } else {
                    continue;
                }
                compared += 1;
            }
            assert!(compared >= 4, "{name}: only {compared}");
        }
    }
}

/// Every `data-value` of a page.
fn pointers(page: &str) -> Vec<String> {
    page.split("data-value=\"")
        .skip(1)
        .map(|rest| rest.split('"').next().unwrap().to_owned())
        .collect()
}

/// Tags open and close in order.
fn balanced(page: &str) {
    let mut open: Vec<String> = Vec::new();
    let mut rest = page.split_once("<html").map(|(_, rest)| format!("<html{rest}")).unwrap();
    // What stands in styles is no markup.
    let style = rest.find("<style>").unwrap()..rest.find("</style>").unwrap();
    rest.replace_range(style, "<style>");
    for piece in rest.split('<').skip(1) {
        let tag = piece.split('>').next().unwrap();
        assert!(piece.contains('>'), "a tag that does not end: {piece:.40}");
        let name: String =
            tag.trim_start_matches('/').chars().take_while(|c| c.is_ascii_alphanumeric()).collect();
        if tag.starts_with('/') {
            assert_eq!(open.pop(), Some(name.clone()), "</{name}> closes another tag");
        } else if !tag.ends_with('/')
            && !matches!(name.as_str(), "meta" | "br")
            && !tag.starts_with('!')
        {
            open.push(name);
        }
    }
    assert_eq!(open, Vec::<String>::new());
}

#[test]
fn the_page_stands_alone_and_its_figures_resolve() {
    for (name, case) in examples() {
        let advice = advice::advise(&case);
        let json: Value = report::advice_json(&case, &advice);
        for units in [Units::Metric, Units::Us] {
            let page = report::html(&case, &advice, units);
            let found = pointers(&page);
            assert!(found.len() > 70, "{name}: {}", found.len());
            for pointer in found {
                assert!(json.pointer(&pointer).is_some(), "{name}: {pointer}");
            }
            for word in
                ["<script", "javascript:", "@import", "url(", " src=", " href=", "<link", "<iframe"]
            {
                assert!(!page.contains(word), "{name}: {word}");
            }
            balanced(&page);
            // Nothing of the card is dropped: every caution stands on it with its signal word.
            let card = page.split("<main").next().unwrap();
            assert_eq!(card.matches("<li class=\"").count(), advice.cautions.len(), "{name}");
        }
    }
}

#[test]
fn cards_are_what_they_were() {
    for (name, case) in examples() {
        let page = report::html(&case, &advice::advise(&case), case.units);
        let card = page
            .split("<section class=\"card\">")
            .nth(1)
            .unwrap()
            .split("</section>")
            .next()
            .unwrap();
        insta::assert_snapshot!(format!("card-{name}"), card);
    }
}

/// Texts that a case may bring.
const HARM: &[&str] = &[
    "<script>alert(1)</script>",
    "\" onload=\"x\" 'y' & &amp; </style></section>",
    "\u{202e}desrever\u{202c} \u{2066}x\u{2069}",
    "🚜❄️ Ünïcodé 油圧",
    "\u{1b}[31mred\u{1b}]0;title\u{7}\u{8}",
    "| a | b |\n# head\n- x `code` *b* _i_ [l](u)",
];

fn hostile(text: &str) -> Case {
    let mut file = CaseFile::read("hostile", include_str!("../examples/hollow-skid.toml"));
    file.set("title", text).unwrap();
    file.set("oil[1].name", text).unwrap();
    file.set("oil[1].class", text).unwrap();
    file.check().unwrap_or_else(|faults| panic!("{faults}"))
}

#[test]
fn text_of_a_case_stays_text() {
    let long = "Wahrheitsgemäß".repeat(22);
    for text in HARM.iter().copied().chain([long.as_str()]) {
        let case = hostile(text);
        let advice = advice::advise(&case);
        let page = report::html(&case, &advice, Units::Metric);
        balanced(&page);
        assert!(!page.contains("<script") && !page.contains("onload=\"x"), "{text}");
        for c in ['\u{1b}', '\u{7}', '\u{8}', '\u{202e}', '\u{2066}'] {
            assert!(!page.contains(c), "{text:?}: {c:?}");
        }
        let document = report::advice(&case, &advice, Units::Metric);
        let plain = report::text(&document, report::Look::default());
        assert!(!plain.chars().any(|c| c.is_control() && c != '\n'), "{text}");
        for line in plain.lines() {
            assert!(line.chars().count() <= 80, "{line}");
        }
        // A mark behind a backslash is text.
        let markdown = report::markdown(&document).replace("\\<", "").replace("\\`", "");
        assert!(!markdown.contains('<') && !markdown.contains('`'), "{text}");
    }
}

/// Chromium, where it is installed.
fn chromium() -> Option<PathBuf> {
    let found = ["/usr/bin/chromium", "/usr/bin/chromium-browser"]
        .iter()
        .map(PathBuf::from)
        .find(|path| path.exists());
    if found.is_none() {
        println!("skipped: Chromium is not installed here");
    }
    found
}

/// Prints a page; (pages, console messages).
fn print(chromium: &Path, folder: &Path, name: &str, page: &str) -> (usize, String) {
    let source = folder.join(format!("{name}.html"));
    let target = folder.join(format!("{name}.pdf"));
    std::fs::write(&source, page).unwrap();
    let output = Command::new(chromium)
        .args([
            "--headless",
            "--no-sandbox",
            "--disable-gpu",
            "--disable-quic",
            "--no-first-run",
            "--disable-background-networking",
            "--disable-component-update",
            "--disable-sync",
            "--no-pdf-header-footer",
            "--enable-logging=stderr",
        ])
        .arg(format!("--user-data-dir={}", folder.join("profile").display()))
        .arg(format!("--print-to-pdf={}", target.display()))
        .arg(format!("file://{}", source.display()))
        .output()
        .unwrap();
    let said = String::from_utf8_lossy(&output.stderr).into_owned();
    let bytes = std::fs::read(&target).unwrap_or_else(|_| panic!("{name} was not printed: {said}"));
    let text = String::from_utf8_lossy(&bytes);
    let pages = text.matches("/Type /Page\n").count() + text.matches("/Type/Page\n").count();
    (pages, said)
}

#[test]
fn the_card_prints_on_one_page() {
    let Some(chromium) = chromium() else { return };
    let folder = std::env::temp_dir().join(format!("coldsump-print-{}", std::process::id()));
    std::fs::create_dir_all(&folder).unwrap();
    // The worst: the most cautions and steps, the longest names.
    let long = "Very large excavator with an extraordinarily long name, ".repeat(5);
    let mut worst: Option<(usize, String, Case)> = None;
    let mut all = examples();
    for (name, case) in &all {
        let mut file = CaseFile::read(
            name,
            &std::fs::read_to_string(format!("examples/{name}.toml")).unwrap(),
        );
        file.set("title", &long).unwrap();
        if case.lists_oils() {
            file.set("oil[1].name", &long).unwrap();
        }
        for (key, value) in [
            ("site.minimum_temperature", "-45 °C"),
            ("site.heating_temperature", "none"),
            ("supply", "none"),
            ("machine.hose_rating", "none"),
            ("machine.accumulator.precharge", "30 bar"),
            ("machine.accumulator.at", "20 °C"),
            ("pump.neutral", "none"),
            ("pump.charge_pressure", "none"),
        ] {
            file.set(key, value).unwrap();
        }
        let case = file.check().unwrap_or_else(|faults| panic!("{faults}"));
        let weight = advice::advise(&case).cautions.len();
        if worst.as_ref().is_none_or(|(most, ..)| weight > *most) {
            worst = Some((weight, format!("worst-{name}"), case));
        }
    }
    let (weight, name, case) = worst.unwrap();
    assert!(weight > 25, "the worst case has only {weight} cautions");
    all.push((name, case));
    for (name, case) in all {
        let advice = advice::advise(&case);
        let page = report::html(&case, &advice, case.units);
        for size in ["A4", "letter"] {
            let only = page.replace(
                "</head>",
                &format!("<style>.pages {{ display: none }} .card {{ break-after: auto }} @page {{ size: {size} }}</style></head>"),
            );
            let (pages, said) = print(&chromium, &folder, &format!("{name}-{size}"), &only);
            assert_eq!(pages, 1, "{name} on {size}");
            assert!(!said.contains("CONSOLE"), "{said}");
        }
    }
    std::fs::remove_dir_all(&folder).unwrap();
}
