//! What follows from a case: limits, floors, heating, verdict; plans and choice; the steps.
//!
//! Three tiers over each other: [`assess`] (one oil in one case), [`decide`] (every oil, plans, choice),
//! [`advise`] (procedure, cautions, what to confirm, what would help, how every number was reached).
//!
//! Invariants: floors are derived from the one table of [`limits`], never stored beside it; a check
//! that could not be made is `not-checked`, and a start whose inlet was not checked never reads
//! plain `starts-cold`; every limit of the cold side is judged on the thick edge of the likely
//! range, every limit of the hot side on the thin edge.

mod advise;
mod ask_for;
mod assess;
mod assumptions;
mod cautions;
mod cold;
mod decide;
mod evidence;
mod first_turn;
mod heating;
mod levers;
pub mod limits;
mod night;
mod plan;
mod procedure;
mod say;
mod setup;
pub use setup::Setup;

pub use advise::{Advice, advise};
pub use ask_for::{ASK_FOR, AskFor};
pub use assess::{Assessment, Floor, LimitResult, Verdict, assess};
pub use assumptions::{Confirm, Range};
pub use cautions::{Caution, CautionRow, Signal, caution_rows};
pub use cold::{Against, Cold, Timing, WINTER_AHEAD, WinterAhead};
pub use decide::{Choice, Decision, decide};
pub use evidence::{Evidence, SOAK, THERMOSTAT};
pub use first_turn::{Circulation, FirstTurn, SpeedStep};
pub use heating::{Fitted, Heating, HeatingStatus, HeatingWhy};
pub use levers::Lever;
pub use limits::{Edge, LIMITS, LimitId, LimitRow, Outcome, Side, Why};
pub use night::{Night, NightPart, Stretch, night};
pub use plan::{HOLD, Plan, PlanKind};
pub use procedure::{Bound, Gate, Phase, Reading, Step};
pub use say::{Figure, Fill, Part, Reason, Say};
