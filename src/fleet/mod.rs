//! Many machines: rows in, decisions out; what to stock, and what the yard's supply must carry.
//!
//! A row is a case: a base file with the row's columns set over it, through the same `set` and `check`
//! as everything else. What a row comes to does not hang on the rows beside it; stock and yard plan
//! need them all.
//!
//! Invariants: rows come out in the order they went in; a bad row is told and stops nothing.

mod machine;
mod rows;
mod stock;
mod yard;

pub use machine::{Machine, OilChoice};
pub use rows::{Row, Rows, RowsError};
pub use stock::{Stock, stock};
pub use yard::{Job, Slot, Yard, yard};
