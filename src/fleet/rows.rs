//! Rows of a fleet: CSV, TOML or JSON Lines, each a machine with the keys set over its base.

use crate::case::keys;
use crate::case::{CaseFile, Edit};
use std::io::{BufRead, BufReader, Read};

/// One machine as it was read.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Row {
    /// Line, or number of the entry, from 1.
    pub line: u64,
    /// What it is called.
    pub machine: String,
    /// How many alike.
    pub count: u32,
    /// The case file it is set over, where one is named.
    pub base: Option<String>,
    /// Keys set.
    pub edits: Vec<Edit>,
}

/// What is wrong with a fleet file as a whole, or with one row.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("{message}")]
pub struct RowsError {
    /// Line, from 1, where one is to blame.
    pub line: Option<u64>,
    /// What is wrong and what would be right.
    pub message: String,
}

fn wrong(line: u64, message: impl Into<String>) -> RowsError {
    RowsError { line: Some(line), message: message.into() }
}

/// The rows of a fleet, read one by one.
pub struct Rows<R: Read>(Kind<R>);

enum Kind<R: Read> {
    Csv { reader: Box<csv::Reader<BufReader<R>>>, columns: Vec<String> },
    Lines { reader: BufReader<R>, line: u64 },
    Listed(std::vec::IntoIter<Row>),
}

/// No line of a fleet is longer, bytes.
const LONGEST_LINE: u64 = 1 << 20;

impl<R: Read> Rows<R> {
    /// Opens a fleet; the layout is told by its first character: `{` JSON Lines, `[` TOML, else CSV.
    ///
    /// # Errors
    /// A header with columns that are no keys, TOML that is no fleet.
    pub fn open(reader: R) -> Result<Self, RowsError> {
        let mut reader = BufReader::with_capacity(1 << 16, reader);
        let start =
            reader.fill_buf().map_err(|e| RowsError { line: None, message: e.to_string() })?;
        let text = String::from_utf8_lossy(start);
        let head = text.trim_start_matches('\u{feff}').trim_start();
        if head.starts_with('{') {
            return Ok(Self(Kind::Lines { reader, line: 0 }));
        }
        // A comment or a table head is TOML; a CSV header is neither.
        if head.starts_with('[') || head.starts_with('#') {
            let mut whole = String::new();
            reader
                .read_to_string(&mut whole)
                .map_err(|e| RowsError { line: None, message: e.to_string() })?;
            return Ok(Self(Kind::Listed(listed(&whole)?.into_iter())));
        }
        let first = head.lines().next().unwrap_or_default().to_owned();
        let delimiter = [b';', b'\t', b',']
            .into_iter()
            .max_by_key(|d| first.bytes().filter(|b| b == d).count())
            .unwrap_or(b',');
        let mut csv = csv::ReaderBuilder::new()
            .delimiter(delimiter)
            .flexible(true)
            .trim(csv::Trim::All)
            // Lines are counted right with either line end; the carriage return is trimmed.
            .terminator(csv::Terminator::Any(b'\n'))
            .from_reader(reader);
        let header = csv.headers().map_err(|error| wrong(1, error.to_string()))?.clone();
        let columns: Vec<String> =
            header.iter().map(|name| name.trim_start_matches('\u{feff}').to_owned()).collect();
        for name in &columns {
            known(name).map_err(|message| wrong(1, message))?;
        }
        if !columns.iter().any(|name| name == "machine") {
            return Err(wrong(
                1,
                "has no column `machine`; the first line names the columns, for example `machine,base,site.minimum_temperature`",
            ));
        }
        Ok(Self(Kind::Csv { reader: Box::new(csv), columns }))
    }
}

/// A column that is no key, with the nearest.
fn known(name: &str) -> Result<(), String> {
    if matches!(name, "machine" | "count" | "base")
        || keys::find(name).is_some()
        || keys::table_of(name).is_some()
    {
        return Ok(());
    }
    Err(match keys::nearest(name) {
        Some(near) => format!("column `{name}` is no key; did you mean `{near}`?"),
        None => format!("column `{name}` is no key; the README lists all keys"),
    })
}

impl<R: Read> Iterator for Rows<R> {
    type Item = Result<Row, RowsError>;

    fn next(&mut self) -> Option<Self::Item> {
        match &mut self.0 {
            Kind::Listed(rows) => rows.next().map(Ok),
            Kind::Csv { reader, columns } => {
                let mut record = csv::StringRecord::new();
                match reader.read_record(&mut record) {
                    Ok(false) => None,
                    Ok(true) => {
                        let line = record.position().map_or(0, csv::Position::line);
                        Some(from_record(line, columns, &record))
                    }
                    Err(error) => {
                        let line = error.position().map_or(0, csv::Position::line);
                        let done = error.is_io_error();
                        let message = wrong(line, format!("cannot be read: {error}"));
                        if done {
                            self.0 = Kind::Listed(Vec::new().into_iter());
                        }
                        Some(Err(message))
                    }
                }
            }
            Kind::Lines { reader, line } => loop {
                let mut text = String::new();
                *line += 1;
                match reader.by_ref().take(LONGEST_LINE).read_line(&mut text) {
                    Ok(0) => return None,
                    Ok(_) if text.trim().is_empty() => {}
                    Ok(_) => return Some(from_json(*line, &text)),
                    Err(error) => {
                        let message = wrong(*line, format!("cannot be read: {error}"));
                        self.0 = Kind::Listed(Vec::new().into_iter());
                        return Some(Err(message));
                    }
                }
            },
        }
    }
}

fn from_record(
    line: u64,
    columns: &[String],
    record: &csv::StringRecord,
) -> Result<Row, RowsError> {
    if record.len() > columns.len() {
        return Err(wrong(
            line,
            format!(
                "has {} fields, the header {}; is a field with a comma not quoted?",
                record.len(),
                columns.len()
            ),
        ));
    }
    row(line, columns.iter().map(String::as_str).zip(record.iter()))
}

fn row<'a>(line: u64, fields: impl Iterator<Item = (&'a str, &'a str)>) -> Result<Row, RowsError> {
    let mut out = Row { line, machine: String::new(), count: 1, base: None, edits: Vec::new() };
    for (name, text) in fields {
        let text = text.trim();
        if text.is_empty() {
            continue;
        }
        match name {
            "machine" => text.clone_into(&mut out.machine),
            "base" => out.base = Some(text.to_owned()),
            "count" => {
                out.count =
                    text.parse().ok().filter(|n| (1..=1_000_000).contains(n)).ok_or_else(|| {
                        wrong(line, format!("count: takes a whole number from 1, but is `{text}`"))
                    })?;
            }
            _ => out.edits.push(Edit::new(name, text)),
        }
    }
    if out.machine.is_empty() {
        return Err(wrong(line, "machine: is missing; give each machine a name"));
    }
    Ok(out)
}

fn from_json(line: u64, text: &str) -> Result<Row, RowsError> {
    let value: serde_json::Value = serde_json::from_str(text)
        .map_err(|error| wrong(line, format!("is no JSON object: {error}")))?;
    let serde_json::Value::Object(map) = value else {
        return Err(wrong(
            line,
            "is no JSON object; write for example {\"machine\": \"Loader 12\"}",
        ));
    };
    let mut fields = Vec::with_capacity(map.len());
    for (name, value) in map {
        known(&name).map_err(|message| wrong(line, message))?;
        fields.push((
            name.clone(),
            match value {
                serde_json::Value::String(text) => text,
                serde_json::Value::Null => String::new(),
                value @ (serde_json::Value::Number(_) | serde_json::Value::Bool(_)) => {
                    value.to_string()
                }
                _ => return Err(wrong(line, format!("{name}: takes text or a number"))),
            },
        ));
    }
    row(line, fields.iter().map(|(name, text)| (name.as_str(), text.as_str())))
}

/// `[[machine]]` tables with quoted or dotted keys.
fn listed(text: &str) -> Result<Vec<Row>, RowsError> {
    #[derive(serde::Deserialize)]
    #[serde(deny_unknown_fields)]
    struct Fleet {
        machine: Vec<toml::Table>,
    }
    let fleet: Fleet = toml::from_str(text).map_err(|error| {
        let at = error.span().map_or(0, |span| span.start);
        let line = text.get(..at).unwrap_or_default().matches('\n').count() as u64 + 1;
        wrong(line, error.message().replace('\n', "; "))
    })?;
    fleet
        .machine
        .into_iter()
        .enumerate()
        .map(|(at, table)| {
            let line = at as u64 + 1;
            let mut fields = Vec::new();
            flatten("", table, &mut fields);
            for (name, _) in &fields {
                let name = if name == "name" { "machine" } else { name };
                known(name).map_err(|message| wrong(line, message))?;
            }
            row(
                line,
                fields
                    .iter()
                    .map(|(n, t)| (if n == "name" { "machine" } else { n.as_str() }, t.as_str())),
            )
        })
        .collect()
}

fn flatten(above: &str, table: toml::Table, out: &mut Vec<(String, String)>) {
    for (key, value) in table {
        let path = if above.is_empty() { key } else { format!("{above}.{key}") };
        match value {
            toml::Value::Table(table) => flatten(&path, table, out),
            toml::Value::String(text) => out.push((path, text)),
            toml::Value::Array(list) => {
                let items: Vec<String> = list
                    .iter()
                    .map(|item| item.as_str().map_or_else(|| item.to_string(), str::to_owned))
                    .collect();
                out.push((path, items.join("; ")));
            }
            other => out.push((path, other.to_string())),
        }
    }
}

impl Row {
    /// The case file of the row: its base, or an empty one, with its keys and `sets` over it.
    ///
    /// # Errors
    /// A key that cannot be set.
    pub fn case_file(&self, base: Option<&CaseFile>, sets: &[Edit]) -> Result<CaseFile, String> {
        let mut file = match base {
            Some(base) => base.clone(),
            None => CaseFile::read(&self.machine, "format = 1\n"),
        };
        let mut put = |edit: &Edit| {
            file.set(&edit.key, &edit.value)
                .map_err(|fault| format!("{}: {}", edit.key, fault.message))
        };
        put(&Edit::new("title", &self.machine))?;
        for edit in self.edits.iter().chain(sets) {
            put(edit)?;
        }
        Ok(file)
    }
}
