//! JSON Schemas: of the advice, as committed; of the case, made from the key table.

use crate::case::keys::{self, Key, KeyKind, Need};
use serde_json::{Map, Value, json};

/// The schema of the advice, draft-07.
pub const ADVICE_SCHEMA: &str = include_str!("advice.schema.json");

/// The schema of a case file, draft-07, for editors that read TOML with one.
#[must_use]
pub fn case_schema() -> Value {
    let mut root = Section::default();
    let mut oil = Section::default();
    for key in keys::all() {
        match key.path.strip_prefix("oil.") {
            Some(path) => oil.put(path, &key),
            None => root.put(key.path, &key),
        }
    }
    let mut schema = root.value();
    if let Value::Object(map) = &mut schema {
        map.insert("$schema".to_owned(), json!("http://json-schema.org/draft-07/schema#"));
        map.insert("title".to_owned(), json!("coldsump case, format 1"));
        if let Some(Value::Object(properties)) = map.get_mut("properties") {
            properties.insert("oil".to_owned(), json!({ "type": "array", "items": oil.value() }));
        }
    }
    schema
}

/// A table of keys, with the tables inside it.
#[derive(Default)]
struct Section {
    keys: Map<String, Value>,
    required: Vec<String>,
    inside: std::collections::BTreeMap<String, Self>,
}

impl Section {
    fn put(&mut self, path: &str, key: &Key) {
        match path.split_once('.') {
            Some((section, rest)) => {
                self.inside.entry(section.to_owned()).or_default().put(rest, key);
            }
            None => {
                if key.need == Need::Required && path != "minimum_temperature" {
                    self.required.push(path.to_owned());
                }
                self.keys.insert(path.to_owned(), schema_of(key));
            }
        }
    }

    fn value(self) -> Value {
        let mut properties = self.keys;
        for (name, section) in self.inside {
            properties.insert(name, section.value());
        }
        let mut map = json!({
            "type": "object",
            "additionalProperties": false,
            "properties": properties,
        });
        if let (false, Value::Object(map)) = (self.required.is_empty(), &mut map) {
            map.insert("required".to_owned(), json!(self.required));
        }
        map
    }
}

fn schema_of(key: &Key) -> Value {
    let mut value = match key.kind {
        KeyKind::Switch => json!({ "type": "boolean" }),
        KeyKind::Whole => json!({ "type": "integer" }),
        KeyKind::Number(least, most) => {
            json!({ "type": "number", "minimum": least, "maximum": most })
        }
        KeyKind::Choice(words) => json!({ "type": "string", "enum": words }),
        KeyKind::Powers => json!({ "type": "array", "items": { "type": "string" } }),
        KeyKind::ViscosityTable => {
            json!({ "type": "object", "additionalProperties": { "type": "string" } })
        }
        KeyKind::FittingTable => {
            json!({ "type": "object", "additionalProperties": { "type": "integer" } })
        }
        KeyKind::Text
        | KeyKind::Quantity(_)
        | KeyKind::Viscosity
        | KeyKind::Minimum
        | KeyKind::Clock => json!({ "type": "string" }),
    };
    if let Value::Object(map) = &mut value {
        let text = format!("{} Found: {}. Example: {}", key.question, key.find, key.example);
        map.insert("description".to_owned(), json!(text));
    }
    value
}
