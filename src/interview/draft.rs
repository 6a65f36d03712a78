//! The answers so far: saved whole after each, read again after a break.

use serde::{Deserialize, Serialize};

/// One answer.
#[derive(Debug, Clone, PartialEq, Eq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct Answer {
    /// Of which question.
    pub id: String,
    /// The text.
    pub text: String,
}

/// All answers, in the order in which they were given.
#[derive(Debug, Clone, PartialEq, Eq, Default, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Draft {
    /// Format of the draft, 1.
    format: u32,
    #[serde(default)]
    answer: Vec<Answer>,
}

/// A draft that cannot be read.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("{name}: {message}")]
pub struct DraftError {
    name: String,
    message: String,
}

impl Draft {
    /// Without answers.
    #[must_use]
    pub const fn new() -> Self {
        Self { format: 1, answer: Vec::new() }
    }

    /// Reads a draft.
    ///
    /// # Errors
    /// Text that is no draft.
    pub fn read(name: &str, text: &str) -> Result<Self, DraftError> {
        let wrong = |message: String| DraftError { name: name.to_owned(), message };
        let draft: Self = toml::from_str(text)
            .map_err(|error| wrong(format!("is no draft of an interview: {}", error.message())))?;
        if draft.format != 1 {
            return Err(wrong(format!("this program reads format 1, not {}", draft.format)));
        }
        Ok(draft)
    }

    /// Its text.
    #[must_use]
    pub fn write(&self) -> String {
        toml::to_string(self).unwrap_or_default()
    }

    /// The answer of a question.
    #[must_use]
    pub fn get(&self, id: &str) -> Option<&str> {
        self.answer.iter().find(|answer| answer.id == id).map(|answer| answer.text.as_str())
    }

    /// Sets an answer: a new one goes to the end, an old one keeps its place.
    pub fn set(&mut self, id: &str, text: &str) {
        match self.answer.iter_mut().find(|answer| answer.id == id) {
            Some(answer) => text.clone_into(&mut answer.text),
            None => self.answer.push(Answer { id: id.to_owned(), text: text.to_owned() }),
        }
    }

    /// Takes an answer out.
    pub fn remove(&mut self, id: &str) {
        self.answer.retain(|answer| answer.id != id);
    }

    /// All answers.
    pub fn answers(&self) -> impl Iterator<Item = (&str, &str)> {
        self.answer.iter().map(|answer| (answer.id.as_str(), answer.text.as_str()))
    }

    /// Nothing is answered yet.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.answer.is_empty()
    }
}
