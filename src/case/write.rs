//! A case file written down: sections in the order of the key table.

use super::file::CaseFile;
use super::keys::{KEYS, Key, KeyKind};
use super::policy;

impl CaseFile {
    /// The text of a case file that holds the same keys; comments are not kept.
    ///
    /// # Example
    /// ```
    /// use coldsump::case::CaseFile;
    /// let mut file = CaseFile::read("new", "format = 1");
    /// file.set("pump.kind", "vane").unwrap();
    /// file.set("suction.fittings.elbow-90-long", "2").unwrap();
    /// let text = file.write();
    /// assert!(text.contains("[pump]\nkind = \"vane\""));
    /// assert_eq!(CaseFile::read("again", &text).write(), text);
    /// ```
    #[must_use]
    pub fn write(&self) -> String {
        let mut out = String::new();
        let mut section = "";
        for key in KEYS.iter().filter(|key| !key.path.starts_with("oil.")) {
            self.key(&mut out, key, key.path, &mut section);
        }
        for number in 1..=self.oils() {
            out.push_str("\n[[oil]]\n");
            let mut inside = "oil";
            for key in KEYS.iter().filter(|key| key.path.starts_with("oil.")) {
                let path = key.path.replacen("oil.", &format!("oil[{number}]."), 1);
                self.key(&mut out, key, &path, &mut inside);
            }
        }
        let mut first = true;
        for row in policy::ROWS {
            if let Some(text) = self.text(row.path) {
                if first {
                    out.push_str("\n[policy]\n");
                    first = false;
                }
                let name = row.path.trim_start_matches("policy.");
                out.push_str(&format!("{name} = {}\n", value(row.key().kind, text)));
            }
        }
        out
    }

    fn key(&self, out: &mut String, key: &Key, path: &str, section: &mut &'static str) {
        let (own, name) = key.path.split_once('.').unwrap_or(("", key.path));
        let line = match key.kind {
            KeyKind::ViscosityTable | KeyKind::FittingTable => {
                let rows: Vec<String> = self
                    .below(path)
                    .map(|(at, entry)| {
                        let at = at.trim_matches('"');
                        let kind = match key.kind {
                            KeyKind::FittingTable => KeyKind::Whole,
                            _ => KeyKind::Viscosity,
                        };
                        format!("{} = {}", quoted(at), value(kind, &entry.text))
                    })
                    .collect();
                (!rows.is_empty()).then(|| format!("{name} = {{ {} }}\n", rows.join(", ")))
            }
            kind => self.text(path).map(|text| format!("{name} = {}\n", value(kind, text))),
        };
        let Some(line) = line else { return };
        if own != *section {
            out.push_str(&format!("\n[{own}]\n"));
            *section = own;
        }
        out.push_str(&line);
    }
}

/// A value as TOML has it.
fn value(kind: KeyKind, text: &str) -> String {
    match kind {
        KeyKind::Switch => match text {
            "yes" => "true".to_owned(),
            "no" => "false".to_owned(),
            other => other.to_owned(),
        },
        KeyKind::Whole | KeyKind::Number(..) => text.replace(',', "."),
        KeyKind::Powers => {
            let text = text.trim().trim_start_matches('[').trim_end_matches(']').replace('"', "");
            let separator = if text.contains(';') { ';' } else { ',' };
            let sizes: Vec<String> = text
                .split(separator)
                .map(str::trim)
                .filter(|size| !size.is_empty())
                .map(quoted)
                .collect();
            format!("[{}]", sizes.join(", "))
        }
        _ => quoted(text),
    }
}

/// A TOML basic string.
fn quoted(text: &str) -> String {
    let mut out = String::from("\"");
    for c in text.chars() {
        match c {
            '"' => out.push_str("\\\""),
            '\\' => out.push_str("\\\\"),
            '\n' => out.push_str("\\n"),
            c if c.is_control() => out.push_str(&format!("\\u{:04X}", u32::from(c))),
            c => out.push(c),
        }
    }
    out.push('"');
    out
}
