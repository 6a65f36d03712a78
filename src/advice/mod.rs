//! What follows from a case: limits, floors, heating, verdict.
//!
//! Three tiers are planned over each other; the first is [`assess`]: one oil in one case.
//!
//! Invariants: floors are derived from the one table of [`limits`], never stored beside it; a check
//! that could not be made is `not-checked`, and a start whose inlet was not checked never reads
//! plain `starts-cold`; every limit of the cold side is judged on the thick edge of the likely
//! range, every limit of the hot side on the thin edge.

mod assess;
mod first_turn;
mod heating;
pub mod limits;
mod setup;
pub use setup::Setup;

pub use assess::{Assessment, Floor, LimitResult, Reason, Verdict, assess};
pub use first_turn::{Circulation, FirstTurn, SpeedStep};
pub use heating::{Fitted, Heating, HeatingStatus, HeatingWhy};
pub use limits::{Edge, LIMITS, LimitId, LimitRow, Outcome, Side, Why};
