//! What holds: a brake against the load at rest, a wheel on the ground.

use super::answers::{Solution, absent};
use super::assembly::{LoadAt, Stage};
use crate::fault::{Fault, FaultKind, Note};
use crate::model::Known;
use crate::solution::{Answer, Marks};

impl Solution {
    /// Static effort of the loads at a shaft, losses left out.
    pub(super) fn static_effort(&self, shaft: usize) -> f64 {
        let mut sum = 0.0;
        for load in &self.drive.loads {
            let Some(model) = self.drive.load(load) else { continue };
            let ratio = self.drive.shafts[load.at.shaft].speed / self.drive.shafts[shaft].speed;
            sum += load.sense * model.standstill().holding * load.at.count * ratio;
        }
        sum
    }

    /// Brake effort over the static effort there.
    pub(super) fn holding_reserve(&self, stage: &Stage) -> Result<Answer, Answer> {
        let Some(brake) = self.drive.transmission(stage).and_then(|t| t.brake()) else {
            return Ok(Answer::NoSuch);
        };
        if self.here.as_ref().is_ok_and(|here| here.behind[stage.at.input]) {
            return Err(absent(
                "a freewheel, a neutral gear or an open clutch parts it from the load: it holds nothing",
            ));
        }
        let hold = self.static_effort(stage.at.input).abs();
        if hold == 0.0 {
            return Err(absent("the load does not pull at rest: there is nothing to hold"));
        }
        Ok(self.quantity(brake.effort * stage.at.count / hold, "number", Marks::default()))
    }

    /// The force the ground can take over the force at the wheel.
    pub(super) fn grip_reserve(&self, index: usize) -> Result<Answer, Answer> {
        let stage = &self.drive.stages[index];
        let Some(most) = self.grip_force(stage)? else { return Ok(Answer::NoSuch) };
        let here = self.here()?;
        let asked = here.flow.through[index].output.abs();
        if asked == 0.0 || asked.is_nan() {
            return Err(absent("the wheel passes no force here"));
        }
        Ok(self.quantity(most / asked, "number", here.marks))
    }

    /// The force the ground can take; none without a wheel.
    pub(super) fn grip_force(&self, stage: &Stage) -> Result<Option<f64>, Answer> {
        let Some(grip) = self.drive.transmission(stage).and_then(|t| t.grip()) else { return Ok(None) };
        let share = match grip.share {
            Known::Value(share) => share,
            Known::Missing(field) => {
                let why = Note::plain("the grip of a wheel needs the share of the weight that presses on it");
                let kind = FaultKind::Missing { any_of: vec![vec![field]], why };
                return Err(Answer::Refused(vec![Fault { part: Some(stage.at.part), kind }]));
            }
        };
        let on_it = |load: &&LoadAt| load.at.shaft == stage.at.output;
        let weight = self.drive.loads.iter().filter(on_it).filter_map(|load| {
            self.drive.load(load).and_then(|l| l.weight_on_ground()).map(|w| w * load.at.count)
        });
        let weight: f64 = weight.sum();
        if weight > 0.0 {
            Ok(Some(grip.friction * share * weight))
        } else {
            Err(absent("nothing behind this wheel knows the weight it runs under"))
        }
    }
}
