//! The seam between the questions and whoever answers: a terminal, plain lines, or a script.

use std::collections::BTreeMap;

/// A check of a typed answer: the message under the question where it is not good.
pub(super) type Check<'a> = dyn Fn(&str) -> Result<(), String> + 'a;

/// One question as it is put.
pub struct Prompt<'a> {
    /// The id of its answer.
    pub id: &'a str,
    /// The words.
    pub text: &'a str,
    /// Where the figure is found, and how it may be typed.
    pub help: &'a str,
    /// What Enter gives.
    pub default: Option<&'a str>,
    /// The answers to choose from, each with a word; none: it is typed.
    pub choices: &'a [(String, String)],
    /// Checks what was typed.
    pub check: &'a Check<'a>,
}

/// What came back.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Reply {
    /// An answer that passed the check.
    Text(String),
    /// Back to the question before.
    Back,
}

/// Why there is no answer.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum Stop {
    /// Ctrl-C, or the end of the input.
    #[error("stopped; every answer so far is saved")]
    Interrupted,
    /// A scripted answer is wrong, or missing where it is needed.
    #[error("{0}")]
    Script(String),
    /// The terminal or a file failed.
    #[error("{0}")]
    Io(String),
}

/// Who answers.
pub trait Ask {
    /// Puts a question until it has a good answer.
    ///
    /// # Errors
    /// No answer can be had.
    fn ask(&mut self, prompt: &Prompt<'_>) -> Result<Reply, Stop>;

    /// Says something.
    fn say(&mut self, text: &str);
}

/// Answers by id, for tests and answer files; what is not in it takes what Enter gives, else "I don't
/// know".
#[derive(Debug, Clone, Default)]
pub struct Script {
    name: String,
    answers: BTreeMap<String, String>,
    used: Vec<String>,
    /// What was said, for tests.
    pub said: Vec<String>,
    /// Ids asked, in order.
    pub asked: Vec<String>,
}

impl Script {
    /// From (id, answer); `name` is what messages call it.
    #[must_use]
    pub fn new(name: &str, answers: &[(&str, &str)]) -> Self {
        let answers =
            answers.iter().map(|(id, text)| ((*id).to_owned(), (*text).to_owned())).collect();
        Self { name: name.to_owned(), answers, ..Self::default() }
    }

    /// From the text of an answer file: TOML, `"pump.kind" = "vane"`.
    ///
    /// # Errors
    /// Text that is not such a file.
    pub fn read(name: &str, text: &str) -> Result<Self, String> {
        let table: BTreeMap<String, toml::Value> = toml::from_str(text)
            .map_err(|error| format!("{name}: {}", error.to_string().trim()))?;
        let mut answers = BTreeMap::new();
        for (id, value) in table {
            let text = match value {
                toml::Value::String(text) => text,
                toml::Value::Table(_) | toml::Value::Array(_) => {
                    return Err(format!(
                        "{name}: {id}: takes text, for example `\"{id}\" = \"...\"`; quote an id that has a dot"
                    ));
                }
                other => other.to_string(),
            };
            answers.insert(id, text);
        }
        Ok(Self { name: name.to_owned(), answers, ..Self::default() })
    }

    /// Ids of answers that were never asked for.
    pub fn unused(&self) -> impl Iterator<Item = &str> {
        self.answers.keys().map(String::as_str).filter(|id| !self.used.iter().any(|u| u == id))
    }
}

impl Ask for Script {
    fn ask(&mut self, prompt: &Prompt<'_>) -> Result<Reply, Stop> {
        self.asked.push(prompt.id.to_owned());
        let given = self.answers.get(prompt.id).cloned();
        if given.is_some() {
            self.used.push(prompt.id.to_owned());
        }
        let text =
            given.or_else(|| prompt.default.map(str::to_owned)).unwrap_or_else(|| "?".to_owned());
        match (prompt.check)(&text) {
            Ok(()) => Ok(Reply::Text(text)),
            Err(message) if self.answers.contains_key(prompt.id) => {
                Err(Stop::Script(format!("{}: {}: {message}", self.name, prompt.id)))
            }
            Err(_) => Err(Stop::Script(format!(
                "{}: {}: is missing, and it has no typical value; {}",
                self.name, prompt.id, prompt.text
            ))),
        }
    }

    fn say(&mut self, text: &str) {
        self.said.push(text.to_owned());
    }
}
