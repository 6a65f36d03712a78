//! The case: one machine at one site with the oils and the supply to choose from.
//!
//! A case file goes through three forms: text, [`CaseFile`] (every key with its text and its place),
//! [`Case`] (checked values, with the assumptions that filled the gaps). Changing a value, from the
//! command line or anywhere else, is always the same step: [`CaseFile::set`], then
//! [`CaseFile::check`] again.
//!
//! Invariants: every key stands in the one table of [`keys`]; an assumption is born only in
//! `check`; a case that passed the check holds no contradiction.

mod check;
mod clock;
mod fault;
mod file;
pub mod keys;
mod model;
mod policy;
mod write;

pub use clock::Clock;
pub use fault::{Fault, Faults, Place};
pub use file::CaseFile;
pub use model::{
    Assumption, Case, CaseDrain, Circuit, Cooldown, Duty, Edit, Element, FluidKind, From, Input,
    Machine, MinimumHow, Prefer, Pump, Reservoir, Site, Supply, Units,
};
pub use policy::{LimitPolicy, Policy, PolicyRow, ROWS as POLICY};
