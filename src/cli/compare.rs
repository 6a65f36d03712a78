//! `coldsump compare`: what changed between two cases' advice, and what of the cases did it.

use super::args::{CompareArgs, LookArgs};
use super::assess::Trouble;
use super::{DONE, WRONG, advise, output};
use anyhow::Result;
use coldsump::advice;
use coldsump::report;

pub(crate) fn run(args: &CompareArgs, look: &LookArgs) -> Result<u8> {
    let mut sides = Vec::new();
    for path in [&args.one, &args.other] {
        match advise::case(path, &[], &[]) {
            Ok(case) => {
                let advice = advice::advise(&case);
                sides.push((case, advice));
            }
            Err(Trouble::Wrong(message)) => {
                tell!("{message}");
                return Ok(WRONG);
            }
            Err(Trouble::Io(error)) => return Err(error),
        }
    }
    let [one, other] = sides.as_slice() else { return Ok(WRONG) };
    let units = output::units(args.units).unwrap_or(one.0.units);
    let document = report::compare((&one.0, &one.1), (&other.0, &other.1), units);
    output::put(&report::text(&document, output::look(look)))?;
    Ok(DONE)
}
