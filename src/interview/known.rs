//! What is known so far, in one or two lines after a section.

use super::question::Section;
use crate::advice::{self, Verdict};
use crate::case::Case;
use crate::report::Shown;

/// The lines for a section that just ended.
pub(super) fn so_far(case: &Case, section: Section) -> Vec<String> {
    let shown = Shown(case.units);
    let soak = case.site.minimum.as_celsius();
    match section {
        Section::Pump => vec![format!(
            "the pump takes {} at a start, {} at work",
            shown.viscosity(case.pump.viscosity_start_max.as_mm2_per_s()),
            shown.viscosity(case.pump.viscosity_work_max.as_mm2_per_s())
        )],
        Section::Suction => match &case.suction {
            Some(line) => vec![format!(
                "the suction line is {} inside and {} long",
                shown.length(line.bore_m() * 1000.0),
                shown.length(line.length_m() * 1000.0)
            )],
            None => vec!["no suction line: the inlet will not be checked".to_owned()],
        },
        Section::Oils if case.lists_oils() => case
            .oils
            .iter()
            .take(2)
            .map(|oil| {
                let found = advice::assess(case, oil);
                let thick = match (found.at_soak.expected, found.at_soak.high) {
                    (Some(expected), Some(high)) => format!(
                        "is about {}, it may be {}",
                        shown.viscosity(expected),
                        shown.viscosity(high)
                    ),
                    _ => "sets: it gives no viscosity".to_owned(),
                };
                let limit = shown.viscosity(case.pump.viscosity_start_max.as_mm2_per_s());
                let answer = match found.verdict {
                    Verdict::StartsCold => "it starts cold",
                    Verdict::StartsColdInletUnproven => "it starts cold, if the inlet proves good",
                    Verdict::NeedsHeat => "the tank must be heated, or the oil changed",
                    Verdict::NeedsWholeMachineHeat => {
                        "it gels in the hoses: change the oil or heat the whole machine"
                    }
                    Verdict::NotSuited => "it does not suit this pump",
                };
                format!(
                    "at {} {} {thick}; the pump takes {limit}: {answer}",
                    shown.temperature(soak),
                    oil.name()
                )
            })
            .collect(),
        _ => Vec::new(),
    }
}
