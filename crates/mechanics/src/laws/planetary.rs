//! The planetary train: two wheels and a carrier, speeds after Willis, torques by their balance.
//!
//! Formula: `w_s - i_0 * w_r - (1 - i_0) * w_c = 0` with `i_0 = -z_r / z_s` for a sun and a ring with single planets,
//! or any train's own ratio while the carrier stands. Written `c_s * w_s + c_r * w_r + c_c * w_c = 0` with
//! `c_s = 1, c_r = -i_0, c_c = i_0 - 1`, the reduction from an input to an output member is
//! `-c_out / (c_in + k * c_3)`, where the third member turns k times as fast as the input (0 where it is fixed).
//! Torques on the members stand as these coefficients without losses; with the efficiency e_0 of the train with a
//! standing carrier `i_0` becomes `i_0 * e_0` in them where power rolls from the sun to the ring, `i_0 / e_0` where it
//! rolls the other way; the direction is the one in which power is lost.
//! Symbols: w speed (rad/s) of sun s, ring r, carrier c; i_0 basic ratio, sun over ring speed while the carrier
//! stands (-); z teeth (-); e_0 efficiency of the two meshes with a standing carrier (-).
//! Validity: losses of the meshes; planet bearings and churning oil left aside unless they are counted into e_0.
//! Source: R. Willis, Principles of Mechanism, 1841, for the speeds (from memory); R. S. Khurmi, J. K. Gupta, Theory of
//! Machines, 14th ed., 2009, ch. 13; losses by the usual handbooks of gearing.
//! Revision: 1

use super::Checked;
use crate::registry::Formula;

/// Basic ratio of a sun, single planets and a ring.
pub const BASIC_RATIO: Formula = Formula {
    name: "basic_ratio",
    text: "-z_r / z_s",
    symbols: &[("z_r", "count", "teeth of the ring"), ("z_s", "count", "teeth of the sun")],
    validity: "single planets between an outside and an inside wheel",
    source: "R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, ch. 13",
    revision: 1,
};

/// Reduction between two members.
pub const REDUCTION: Formula = Formula {
    name: "reduction",
    text: "-c_out / (c_in + k * c_3)",
    symbols: &[
        (
            "c_out",
            "number",
            "output's coefficient: 1 for the sun, -i_0 for the ring, i_0 - 1 for the carrier",
        ),
        ("c_in", "number", "input's coefficient, likewise"),
        ("k", "number", "speed of the third member over that of the input, 0 where it is fixed"),
        ("c_3", "number", "third member's coefficient, likewise"),
    ],
    validity: "below zero the output turns against the input",
    source: "R. Willis, Principles of Mechanism, 1841 (from memory)",
    revision: 1,
};

/// Torque on the housing.
pub const REACTION: Formula = Formula {
    name: "reaction_torque",
    text: "abs(s * T_out - T_in)",
    symbols: &[
        ("s", "number", "1 where the output turns with the input, -1 where it turns against it"),
        ("T_out", "torque", "torque on the output shaft"),
        ("T_in", "torque", "torque on the input shaft"),
    ],
    validity: "steady running; the fixed member carries it",
    source: "balance of torques",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &BASIC_RATIO,
        domain: &[(40.0, 200.0), (10.0, 60.0)],
        kernel: |x| basic_ratio(x[1], x[0]),
    },
    Checked {
        formula: &REDUCTION,
        domain: &[(-6.0, -2.0), (0.5, 1.5), (-0.2, 0.2), (1.0, 3.0)],
        kernel: |x| ratio_of(x[1], x[0], x[3], x[2]),
    },
    Checked {
        formula: &REACTION,
        domain: &[(-1.0, 1.0), (0.0, 900.0), (0.0, 200.0)],
        kernel: |x| reaction(x[0], x[1], x[2]),
    },
];

/// Basic ratio of a sun and a ring with single planets.
#[must_use]
pub fn basic_ratio(sun_teeth: f64, ring_teeth: f64) -> f64 {
    -ring_teeth / sun_teeth
}

/// Torque on the housing (or the fixed member), by the sense of the output and both torques.
#[must_use]
pub fn reaction(sense: f64, output: f64, input: f64) -> f64 {
    (sense * output - input).abs()
}

fn ratio_of(input: f64, output: f64, third: f64, third_turns: f64) -> f64 {
    -output / (input + third_turns * third)
}

/// A member of the train.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Member {
    /// The inner wheel (or the first).
    Sun,
    /// The outer wheel (or the second).
    Ring,
    /// What carries the planets.
    Carrier,
}

impl Member {
    /// Its coefficient in the equation of Willis.
    #[must_use]
    pub fn coefficient(self, basic_ratio: f64) -> f64 {
        match self {
            Self::Sun => 1.0,
            Self::Ring => -basic_ratio,
            Self::Carrier => basic_ratio - 1.0,
        }
    }
}

/// A train with its members' parts in the drive.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Train {
    /// Sun speed over ring speed while the carrier stands; neither 0 nor 1.
    pub basic_ratio: f64,
    /// The member that is driven by the source.
    pub input: Member,
    /// The member that drives the load.
    pub output: Member,
    /// The one that is left.
    pub third: Member,
    /// Speed of the third over that of the input; 0 where it is fixed.
    pub third_turns: f64,
}

impl Train {
    /// Input speed over output speed; below zero the output turns against the input.
    #[must_use]
    pub fn reduction(self) -> f64 {
        self.torque_ratio(1.0)
    }

    /// Output torque over input torque, with the basic ratio as the torques see it.
    fn torque_ratio(self, loss: f64) -> f64 {
        let c = |member: Member| member.coefficient(self.basic_ratio * loss);
        ratio_of(c(self.input), c(self.output), c(self.third), self.third_turns)
    }

    /// Efficiencies forward and backward of a train that has this efficiency with a standing carrier. Forward is none
    /// where the train locks itself; backward is 0 or below where it is self-locking.
    #[must_use]
    pub fn efficiencies(self, mesh: f64) -> (Option<f64>, f64) {
        let reduction = self.reduction();
        let ways = [mesh, 1.0 / mesh].map(|loss| self.torque_ratio(loss) / reduction);
        // Power rolls the way in which it is lost; the other sign would make power.
        let lost = |share: &f64| share.is_finite() && *share <= 1.0 + 1e-12;
        let forward = ways.into_iter().filter(|share| *share > 0.0).filter(lost).fold(None, least);
        let backward = ways.map(|share| 1.0 / share).into_iter().filter(lost).fold(None, least);
        (forward, backward.unwrap_or(0.0))
    }
}

fn least(so_far: Option<f64>, share: f64) -> Option<f64> {
    Some(so_far.map_or(share, |least| f64::min(least, share)).min(1.0))
}

#[cfg(test)]
mod tests {
    use super::{Member, Train, basic_ratio, reaction};
    use crate::laws::testing::close;
    use proptest::prelude::*;

    fn train(basic_ratio: f64, input: Member, output: Member) -> Train {
        let third = [Member::Sun, Member::Ring, Member::Carrier];
        let third = third.into_iter().find(|m| *m != input && *m != output).unwrap();
        Train { basic_ratio, input, output, third, third_turns: 0.0 }
    }

    #[test]
    fn published_trains() {
        use Member::{Carrier, Ring, Sun};
        // R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009.
        // Ex. 13.20: sun in, ring fixed, carrier out.
        let set = train(basic_ratio(16.0, 64.0), Sun, Carrier);
        close(set.reduction(), 5.0, 1e-14);
        close(reaction(1.0, 500.0, 100.0), 400.0, 1e-14);
        // Ex. 13.4: two outside wheels of 36 and 45 teeth, the first fixed, then turned by -2 of the arm.
        let arm = train(-45.0 / 36.0, Carrier, Ring);
        close(150.0 / arm.reduction(), 270.0, 1e-14);
        close(150.0 / Train { third_turns: -2.0, ..arm }.reduction(), 510.0, 1e-14);
        // Ex. 13.19: the exact value, where the book rounds.
        let second = train(1.0 / (55.0 / 20.0 * 15.0 / 50.0), Carrier, Ring);
        close(
            train(basic_ratio(15.0, 55.0), Sun, Carrier).reduction() * second.reduction(),
            80.0 / 3.0,
            1e-13,
        );
        // Ex. 13.13, Ferguson's paradox.
        close(1.0 / train(101.0 / 100.0, Carrier, Ring).reduction(), 1.0 / 101.0, 1e-12);
        close(1.0 / train(99.0 / 100.0, Carrier, Ring).reduction(), -1.0 / 99.0, 1e-12);
    }

    #[test]
    fn losses_of_a_common_set() {
        // Sun in, carrier out: of the power only the rolling part loses: (1 + R e) / (1 + R).
        let set = train(-4.0, Member::Sun, Member::Carrier);
        let (forward, backward) = set.efficiencies(0.96);
        close(forward.unwrap(), (1.0 + 4.0 * 0.96) / 5.0, 1e-14);
        close(backward, 5.0 / (1.0 + 4.0 / 0.96), 1e-14);
        // A near-unit train of high ratio cannot be driven back, and from its other end not driven at all.
        let high = train(1.01, Member::Carrier, Member::Ring);
        let (forward, backward) = high.efficiencies(0.98);
        assert!(forward.is_some_and(|e| e > 0.3 && e < 0.4) && backward < 0.0);
        assert_eq!(train(1.01, Member::Ring, Member::Carrier).efficiencies(0.98).0, None);
    }

    proptest! {
        #[test]
        fn no_train_makes_power(ratio in -8.0..-1.2f64, mesh in 0.8..1.0f64, input in 0..3usize, step in 1..3usize) {
            let members = [Member::Sun, Member::Ring, Member::Carrier];
            let set = train(ratio, members[input], members[(input + step) % 3]);
            let (forward, backward) = set.efficiencies(mesh);
            prop_assert!(forward.is_some_and(|e| e > 0.0 && e <= 1.0), "{:?}", forward);
            prop_assert!(backward > 0.0 && backward <= 1.0, "{backward}");
        }
    }
}
