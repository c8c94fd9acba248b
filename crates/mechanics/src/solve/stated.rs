//! A drive at a stated speed: what the sources have to give there, or why they cannot.

use super::assembly::Assembly;
use super::bracket::bracketed;
use super::flow::flow;
use super::points::Commanded;
use super::state::State;
use crate::fault::{Fault, FaultKind, Note};
use crate::solution::Answer;

/// The drive at speed `x` of its root.
pub(crate) fn at(drive: &Assembly, x: f64) -> Result<State, Answer> {
    let there = |share: f64| flow(drive, x, false, &Commanded { drive, share });
    let (least, none, most) = (there(-1.0), there(0.0), there(1.0));
    if most.net < 0.0 {
        let motion = drive.shafts[drive.root].motion.effort_kind();
        let quantities = vec![(most.driving - most.net, motion), (most.driving, motion)];
        let template = "at this speed {0} is required and the sources give at most {1}";
        return Err(Answer::Absent(Note { template, quantities }));
    }
    let share = if none.net <= 0.0 {
        bracketed(|share| there(share).net, 0.0, 1.0)
    } else {
        let unknown = unknown_braking(drive);
        if !unknown.is_empty() {
            return Err(Answer::Refused(unknown));
        }
        if least.net > 0.0 {
            let motion = drive.shafts[drive.root].motion.effort_kind();
            let quantities = vec![(none.net, motion), (none.net - least.net, motion)];
            let template = "at this speed the load drives with {0} and the sources hold back at most {1}";
            return Err(Answer::Absent(Note { template, quantities }));
        }
        bracketed(|share| there(share).net, -1.0, 0.0)
    };
    let mut state = State::with(drive, x, there(share));
    // The speed is stated: that a source could not drive itself here is no question.
    state.faults.retain(|fault| !matches!(fault.kind, FaultKind::BrakingUnknown { .. }));
    Ok(state)
}

/// The fields that would have to say how the sources brake.
fn unknown_braking(drive: &Assembly) -> Vec<Fault> {
    let fault = |source: &super::source::SourceAt| {
        let field = source.braking_unknown()?;
        let supply = source.supply.filter(|_| field == "accepts_return");
        Some(Fault { part: supply.or(Some(source.at.part)), kind: FaultKind::BrakingUnknown { field } })
    };
    drive.sources.iter().filter_map(fault).collect()
}
