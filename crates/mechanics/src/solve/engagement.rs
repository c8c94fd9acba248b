//! A friction clutch that engages: the side that runs drags the side at rest along until both are equally fast.
//!
//! While it slips the clutch passes its full torque. Source and load are left aside meanwhile, and so are the losses
//! of the stages; every inertia is taken at the shaft of the clutch by the square of its ratio.

use super::answers::{Solution, absent};
use crate::laws::clutch::Engagement;
use crate::solution::Answer;

impl Solution {
    /// Time, common speed or heat of engaging the clutch at stage number `index` with its output at rest.
    pub(super) fn engagement(&self, index: usize, name: &str) -> Result<Answer, Answer> {
        let drive = &self.drive;
        let here = self.here()?;
        if !drive.missing_inertia.is_empty() {
            return Err(Answer::Refused(drive.missing_inertia.clone()));
        }
        let stage = &drive.stages[index];
        let state = self.stage_state(here, index);
        let slip = drive.transmission(stage).and_then(|t| t.slip(&state)).ok_or(Answer::NoSuch)?;
        let (driving, driven) = self.sides(index);
        let speed = here.x * drive.shafts[stage.at.input].speed;
        let found = Engagement::new(driving, driven, speed, slip.most * stage.at.count);
        let Some(found) = found.filter(|_| speed > 0.0) else {
            return Err(absent(
                "nothing turns on one of its sides, or has inertia: there is nothing to bring to speed",
            ));
        };
        Ok(match name {
            "engagement_time" => self.quantity(found.time, "time", here.marks),
            "engagement_speed" => self.quantity(found.speed, "rotational_speed", here.marks),
            _ => self.quantity(found.heat, "energy", here.marks),
        })
    }

    /// Inertia before and behind a stage, taken at its own shafts.
    fn sides(&self, index: usize) -> (f64, f64) {
        let drive = &self.drive;
        let stage = &drive.stages[index].at;
        let mut behind = vec![false; drive.shafts.len()];
        behind[stage.output] = true;
        // A tree: each round reaches one shaft farther.
        for _ in 0..drive.stages.len() {
            for (other, between) in drive.stages.iter().enumerate() {
                if other != index && (behind[between.at.input] || behind[between.at.output]) {
                    behind[between.at.input] = true;
                    behind[between.at.output] = true;
                }
            }
        }
        let own = drive.shafts[stage.input].speed;
        let mut sums = (0.0, 0.0);
        for (shaft, behind) in drive.shafts.iter().zip(&behind) {
            let ratio = shaft.speed / own;
            let sum = if *behind { &mut sums.1 } else { &mut sums.0 };
            *sum += shaft.inertia * ratio * ratio;
        }
        sums
    }
}
