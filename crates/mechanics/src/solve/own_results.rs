//! Results that only loads of one kind have: flow, head, thrust, belt tension, power out.

use super::answers::Solution;
use super::assembly::LoadAt;
use crate::fault::{Fault, FaultKind, Note};
use crate::model::{LoadState, Own};
use crate::solution::{Answer, Marks};

impl Solution {
    /// A result that only loads of this kind have.
    pub(super) fn own_of_load(&self, load: &LoadAt, name: &str, state: &LoadState, marks: Marks) -> Answer {
        let Some(model) = self.drive.load(load) else { return Answer::NoSuch };
        match model.own(name) {
            Some(Own::Law { kind, curve }) => self.quantity(curve.at(state.speed), kind, marks),
            Some(Own::Missing(field)) => {
                let why = Note::plain("this result of the load rests on it");
                let kind = FaultKind::Missing { any_of: vec![vec![field]], why };
                Answer::Refused(vec![Fault { part: Some(load.at.part), kind }])
            }
            None => model.answer(name, state).unwrap_or(Answer::NoSuch),
        }
    }
}
