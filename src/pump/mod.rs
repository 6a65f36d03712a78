//! The pump: kinds and their limits, the suction line, the inlet balance, the first turn.
//!
//! Invariants: a suction line is never assumed; the flow drawn is displacement times speed.

mod accumulator;
mod first_turn;
mod fitting;
mod inlet;
mod kind;
mod suction;

pub use accumulator::{PRECHARGE, precharge_kpa};
pub use first_turn::{CASE_DRAIN, HOSE_CLEARING, case_drain_kpa, clearing_time, initial_fill};
pub use fitting::{Fitting, TWO_K};
pub use inlet::{Balance, INLET_BALANCE, Inlet};
pub use kind::{KindLimits, Neutral, PumpKind, Typical};
pub use suction::{CHURCHILL_1977, InletPolicy, STRAINER, Strainer, SuctionLine, friction_factor};

pub(crate) use inlet::GRAVITY;
