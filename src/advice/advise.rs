//! The third tier: everything a case is advised.

use super::ask_for::{self, AskFor};
use super::assumptions::{self, Confirm};
use super::cautions::{self, Caution};
use super::cold::{self, Cold};
use super::decide::{Decision, decide};
use super::evidence::{self, Evidence};
use super::levers::{self, Lever};
use super::procedure::{self, RECORD, Scene, Step};
use crate::case::Case;

/// The advice for one case.
#[derive(Debug, Clone, PartialEq)]
pub struct Advice {
    /// Every oil, all plans, the choice.
    pub decision: Decision,
    /// How cold the case is, as a risk; the winter ahead.
    pub cold: Cold,
    /// The oil to ask a supplier for.
    pub ask_for: AskFor,
    /// The steps, in order.
    pub procedure: Vec<Step>,
    /// What can hurt somebody or the machine, gravest first.
    pub cautions: Vec<Caution>,
    /// Assumptions to confirm, those that govern first.
    pub confirm: Vec<Confirm>,
    /// What would help, best first.
    pub levers: Vec<Lever>,
    /// How every number of the oils was reached.
    pub evidence: Vec<Evidence>,
    /// What is written down on a cold morning.
    pub record: &'static [&'static str],
}

/// Advises on a case.
///
/// # Example
/// ```
/// use coldsump::{advice, case::CaseFile};
/// let file = CaseFile::read("drill.toml", r#"
///     format = 1
///     site.minimum_temperature = "-30 °C"
///     pump.kind = "vane"
///     reservoir.oil_volume = "120 L"
///     duty.time_to_warm = "6 h"
/// "#);
/// let case = file.check().unwrap();
/// let advice = advice::advise(&case);
/// assert!(advice.cautions.iter().any(|caution| caution.row.id == "manual-first"));
/// assert!(advice.ask_for.pour_point_max_c == -40.0);
/// ```
#[must_use]
pub fn advise(case: &Case) -> Advice {
    let decision = decide(case);
    let cold = cold::cold(case, &decision);
    let ask_for = ask_for::ask_for(case);
    let (mut procedure, cautions) = match Scene::new(case, &decision, &ask_for) {
        Some(scene) => (procedure::procedure(&scene), cautions::cautions(&scene)),
        None => (Vec::new(), Vec::new()),
    };
    // A step names only cautions that are shown.
    for step in &mut procedure {
        step.cautions.retain(|id| cautions.iter().any(|caution| caution.row.id == *id));
    }
    let confirm = assumptions::confirm(case, &decision);
    let levers = levers::levers(case, &decision);
    let evidence = evidence::evidence(case, &decision);
    Advice {
        decision,
        cold,
        ask_for,
        procedure,
        cautions,
        confirm,
        levers,
        evidence,
        record: RECORD,
    }
}
