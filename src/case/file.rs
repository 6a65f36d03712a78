//! The case file: TOML text to keys, each with its text and its place.

use super::fault::{Fault, Faults, Place};
use super::keys::{self, Key, KeyKind};
use std::collections::BTreeMap;
use std::ops::Range;
use toml::Spanned;
use toml::de::{DeTable, DeValue};

/// The text of one key and where it stands.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Entry {
    pub(super) text: String,
    pub(super) place: Place,
}

/// A case file as read: keys with texts and places, not yet checked.
///
/// A text that is not TOML, and keys that do not exist, are kept as faults and reported by
/// [`CaseFile::check`] together with everything else that is wrong.
#[derive(Debug, Clone)]
pub struct CaseFile {
    name: String,
    entries: BTreeMap<String, Entry>,
    oils: usize,
    pub(super) faults: Vec<Fault>,
}

/// Reading state: where texts stand.
struct Reader<'a> {
    name: &'a str,
    text: &'a str,
}

impl Reader<'_> {
    fn place(&self, span: &Range<usize>) -> Place {
        let before = self.text.get(..span.start).unwrap_or(self.text);
        let line = before.matches('\n').count() + 1;
        let column = before.rsplit('\n').next().unwrap_or_default().chars().count() + 1;
        Place::At { name: self.name.to_owned(), line, column }
    }
}

impl CaseFile {
    /// Reads the text of a case file. `name` is what messages call it. A byte-order mark and CRLF
    /// line ends are accepted.
    ///
    /// # Example
    /// ```
    /// use coldsump::case::CaseFile;
    /// let case = CaseFile::read("mine.toml", "format = 1\n[pump]\nknd = \"vane\"\n");
    /// let faults = case.check().unwrap_err();
    /// assert!(faults.to_string().contains("mine.toml:3:1: pump.knd: unknown key; did you mean `pump.kind`?"));
    /// ```
    #[must_use]
    pub fn read(name: &str, text: &str) -> Self {
        let text = text.strip_prefix('\u{feff}').unwrap_or(text);
        let mut file =
            Self { name: name.to_owned(), entries: BTreeMap::new(), oils: 0, faults: Vec::new() };
        let reader = Reader { name, text };
        let (table, errors) = DeTable::parse_recoverable(text);
        for error in errors {
            let place = error
                .span()
                .map_or_else(|| Place::Whole { name: name.to_owned() }, |span| reader.place(&span));
            file.faults.push(Fault {
                place,
                key: "file".to_owned(),
                message: format!("not valid TOML: {}", error.message().trim().replace('\n', "; ")),
            });
        }
        file.table(&reader, "", table.get_ref());
        file
    }

    /// The name messages use.
    #[must_use]
    pub fn name(&self) -> &str {
        &self.name
    }

    /// How many oils the file lists.
    #[must_use]
    pub const fn oils(&self) -> usize {
        self.oils
    }

    /// Keys with their texts, in key order.
    pub fn texts(&self) -> impl Iterator<Item = (&str, &str)> {
        self.entries.iter().map(|(key, entry)| (key.as_str(), entry.text.as_str()))
    }

    /// Sets one key over the file, as `--set KEY=VALUE` does; the text `none` takes it out.
    ///
    /// `oil.KEY` is the oil in service or the only one, `oil[2].KEY` the second.
    ///
    /// # Errors
    /// An unknown key, or an oil that is not there. A value of the wrong kind is found by
    /// [`CaseFile::check`].
    pub fn set(&mut self, key: &str, text: &str) -> Result<(), Fault> {
        let path = self.resolve(key.trim())?;
        let fault = |message| Fault { place: Place::Set, key: key.trim().to_owned(), message };
        let known = keys::find(&path).is_some() || keys::table_of(&path).is_some();
        let text = text.trim();
        if text == "none" && (known || keys::is_section(&path)) {
            let below = format!("{path}.");
            self.entries.retain(|at, _| *at != path && !at.starts_with(&below));
            return Ok(());
        }
        if !known {
            return Err(fault(unknown(&path)));
        }
        if let Some(Key { kind: KeyKind::ViscosityTable | KeyKind::FittingTable, .. }) =
            keys::find(&path)
        {
            return Err(fault(format!(
                "is a table; set one entry of it, for example `{}`",
                if path.ends_with("fittings") {
                    format!("{key}.elbow-90-long=2")
                } else {
                    format!("{key}.40 °C=46 mm²/s")
                }
            )));
        }
        self.entries.insert(path, Entry { text: text.to_owned(), place: Place::Set });
        Ok(())
    }

    /// Keeps only the oils at these places, from 0 in file order, and numbers them anew.
    pub fn keep_oils(&mut self, keep: &[usize]) {
        let mut entries = BTreeMap::new();
        for (key, entry) in std::mem::take(&mut self.entries) {
            let of_oil = key.strip_prefix("oil[").and_then(|rest| rest.split_once(']'));
            let moved = match of_oil {
                None => Some(key),
                Some((number, rest)) => number.parse::<usize>().ok().and_then(|number| {
                    let to = keep.iter().position(|at| at + 1 == number)?;
                    Some(format!("oil[{}]{rest}", to + 1))
                }),
            };
            if let Some(key) = moved {
                entries.insert(key, entry);
            }
        }
        self.entries = entries;
        self.oils = keep.len();
    }

    /// `oil.KEY` to `oil[n].KEY`; other keys as they are.
    fn resolve(&mut self, key: &str) -> Result<String, Fault> {
        let fault = |message| Err(Fault { place: Place::Set, key: key.to_owned(), message });
        if let Some(rest) = key.strip_prefix("oil.") {
            let in_service: Vec<usize> = (1..=self.oils)
                .filter(|n| self.text(&format!("oil[{n}].in_service")) == Some("true"))
                .collect();
            return match (in_service.as_slice(), self.oils) {
                ([one], _) => Ok(format!("oil[{one}].{rest}")),
                (_, 0) => {
                    self.oils = 1;
                    Ok(format!("oil[1].{rest}"))
                }
                ([], 1) => Ok(format!("oil[1].{rest}")),
                (_, oils) => fault(format!(
                    "there are {oils} oils and not exactly one is in service; write for example `oil[1].{rest}`"
                )),
            };
        }
        if let Some(after) = key.strip_prefix("oil[") {
            let number = after.split_once(']').and_then(|(n, _)| n.parse::<usize>().ok());
            return match number {
                Some(n) if n >= 1 && n <= self.oils => Ok(key.to_owned()),
                Some(n) if n == self.oils + 1 => {
                    self.oils = n;
                    Ok(key.to_owned())
                }
                _ => fault(format!("there are {} oils in this case", self.oils)),
            };
        }
        Ok(key.to_owned())
    }

    /// The text of a key, as it stands in the file or was set over it.
    #[must_use]
    pub fn get(&self, key: &str) -> Option<&str> {
        self.text(key)
    }

    pub(super) fn entry(&self, key: &str) -> Option<&Entry> {
        self.entries.get(key)
    }

    pub(super) fn text(&self, key: &str) -> Option<&str> {
        self.entries.get(key).map(|entry| entry.text.as_str())
    }

    /// Entries below a key, with what follows the key.
    pub(super) fn below<'a>(&'a self, key: &str) -> impl Iterator<Item = (String, &'a Entry)> {
        let start = format!("{key}.");
        self.entries
            .range(start.clone()..)
            .take_while({
                let start = start.clone();
                move |(at, _)| at.starts_with(&start)
            })
            .filter_map(move |(at, entry)| Some((at.strip_prefix(&start)?.to_owned(), entry)))
    }

    /// The place of a key, or the whole file where it is not given.
    pub(super) fn place(&self, key: &str) -> Place {
        self.entry(key)
            .map_or_else(|| Place::Whole { name: self.name.clone() }, |entry| entry.place.clone())
    }

    fn table(&mut self, reader: &Reader<'_>, section: &str, table: &DeTable<'_>) {
        // File order, whatever order the map keeps.
        let mut rows: Vec<_> = table.iter().collect();
        rows.sort_by_key(|(key, _)| key.span().start);
        for (key, value) in rows {
            let path = if section.is_empty() {
                key.get_ref().to_string()
            } else {
                format!("{section}.{}", key.get_ref())
            };
            self.value(reader, &path, &key.span(), value);
        }
    }

    fn value(
        &mut self,
        reader: &Reader<'_>,
        path: &str,
        key_span: &Range<usize>,
        value: &Spanned<DeValue<'_>>,
    ) {
        let span = value.span();
        if path == "oil" {
            match value.get_ref() {
                DeValue::Array(list) => {
                    for item in list.iter() {
                        match item.get_ref() {
                            DeValue::Table(table) => {
                                self.oils += 1;
                                let section = format!("oil[{}]", self.oils);
                                self.table(reader, &section, table);
                            }
                            other => self.wrong(
                                reader,
                                path,
                                &item.span(),
                                "a table headed `[[oil]]`",
                                other,
                            ),
                        }
                    }
                }
                DeValue::Table(table) => {
                    self.oils = 1;
                    self.table(reader, "oil[1]", table);
                }
                other => self.wrong(reader, path, &span, "a table headed `[[oil]]`", other),
            }
            return;
        }
        let Some(key) = keys::find(path) else {
            if let Some((table_key, _)) = keys::table_of(path) {
                match scalar(value.get_ref()) {
                    Some(text) => self.insert(reader, path, &span, text),
                    None => self.wrong(reader, path, &span, &table_key.takes(), value.get_ref()),
                }
            } else if keys::is_section(path) {
                match value.get_ref() {
                    DeValue::Table(table) => self.table(reader, path, table),
                    other => self.wrong(reader, path, &span, "a table", other),
                }
            } else {
                self.faults.push(Fault {
                    place: reader.place(key_span),
                    key: path.to_owned(),
                    message: unknown(path),
                });
            }
            return;
        };
        match (key.kind, value.get_ref()) {
            (KeyKind::ViscosityTable | KeyKind::FittingTable, DeValue::Table(table)) => {
                self.table(reader, path, table);
            }
            (KeyKind::Powers, DeValue::Array(list)) => {
                let texts: Option<Vec<String>> =
                    list.iter().map(|item| scalar(item.get_ref())).collect();
                match texts {
                    Some(texts) => self.insert(reader, path, &span, texts.join("; ")),
                    None => self.wrong(reader, path, &span, &key.takes(), value.get_ref()),
                }
            }
            (_, found) => match scalar(found) {
                Some(text) if fits(key.kind, found) => self.insert(reader, path, &span, text),
                Some(_) | None => self.wrong(reader, path, &span, &key.takes(), found),
            },
        }
    }

    fn insert(&mut self, reader: &Reader<'_>, path: &str, span: &Range<usize>, text: String) {
        self.entries.insert(path.to_owned(), Entry { text, place: reader.place(span) });
    }

    fn wrong(
        &mut self,
        reader: &Reader<'_>,
        path: &str,
        span: &Range<usize>,
        takes: &str,
        found: &DeValue<'_>,
    ) {
        let found = match found {
            DeValue::Table(_) => "a table".to_owned(),
            DeValue::Array(_) => "a list".to_owned(),
            DeValue::Datetime(at) => format!("the date or time {at}"),
            other => scalar(other).map_or_else(|| "nothing".to_owned(), |text| format!("`{text}`")),
        };
        let example = keys::find(path).map(|key| format!(", for example {}", key.example));
        self.faults.push(Fault {
            place: reader.place(span),
            key: path.to_owned(),
            message: format!("takes {takes}{}, but is {found}", example.unwrap_or_default()),
        });
    }

    /// All faults of the reading, then those of the check, in file order.
    pub(super) fn sorted(&self, mut found: Vec<Fault>) -> Faults {
        let mut faults = self.faults.clone();
        faults.append(&mut found);
        faults.sort_by(|a, b| a.place.cmp(&b.place));
        faults.dedup();
        Faults(faults)
    }
}

fn unknown(path: &str) -> String {
    match keys::nearest(path) {
        Some(near) => format!("unknown key; did you mean `{near}`?"),
        None => "unknown key; the README lists all keys".to_owned(),
    }
}

/// The text of a value that is neither table nor list nor date.
fn scalar(value: &DeValue<'_>) -> Option<String> {
    match value {
        DeValue::String(text) => Some(text.to_string()),
        DeValue::Integer(number) if number.radix() == 10 => Some(number.as_str().replace('_', "")),
        DeValue::Float(number) => Some(number.as_str().replace('_', "")),
        DeValue::Boolean(yes) => Some(yes.to_string()),
        DeValue::Datetime(at) => Some(at.to_string()),
        _ => None,
    }
}

/// Whether the TOML type suits the key; numbers may stand where text with a unit is wanted, so that
/// the message can be about the unit.
fn fits(kind: KeyKind, value: &DeValue<'_>) -> bool {
    match (kind, value) {
        (KeyKind::Switch, value) => value.is_bool(),
        (KeyKind::Whole, value) => value.is_integer(),
        (KeyKind::Number(..), value) => value.is_integer() || value.is_float(),
        (KeyKind::Text | KeyKind::Choice(_), value) => value.is_str(),
        // 06:00:00 is a TOML time; the message about `06:00` comes from the clock's own reader.
        (KeyKind::Clock, DeValue::Datetime(_)) => true,
        (_, DeValue::Datetime(_) | DeValue::Boolean(_)) => false,
        _ => true,
    }
}
