//! The interview: questions a technician can answer at the machine, and the case they make.
//!
//! What is known is the list of answers. The case is made anew from them after every answer, through
//! the same `set` and `check` as a file; going back, changing an answer and going on after a break are
//! changes of that list.
//!
//! Invariants: nothing can be answered here that a case file cannot say; every key of the key table is
//! asked for (a test holds both together); an answer that is not wanted any more is named when it is
//! dropped.

mod ask;
mod draft;
mod flow;
mod hose;
mod known;
mod question;

pub use ask::{Ask, Prompt, Reply, Script, Stop};
pub use draft::{Draft, DraftError};
pub use flow::{Length, interview};
pub use hose::bore_of;
pub use question::{QUESTIONS, Question, Section};
