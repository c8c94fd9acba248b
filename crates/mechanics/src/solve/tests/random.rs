//! Laws that hold for every drive.

use crate::curve::Law;
use crate::solution::{Mode, Stability};
use crate::solve::assembly::Assembly;
use crate::solve::points::{Net, range};
use crate::solve::solve;
use crate::solve::testing::{Rig, number};
use proptest::prelude::*;

prop_compose! {
    /// A source with up to three humps against a load of mixed shape, through two lossy stages with drag.
    fn drives()(
        stall in 5.0..60.0f64, slope in -1.5..0.3f64, most in 0.0..80.0f64, slip in 0.03..0.5f64,
        ratio in 0.2..8.0f64, second in 0.3..5.0f64, losses in (0.5..1.0f64, 0.5..1.0f64),
        drag in 0.0..2.0f64, weight in -30.0..30.0f64, friction in 0.0..10.0f64, viscous in 0.0..0.2f64,
        square in 0.0..0.01f64, power in 0.0..800.0f64, inertia in (0.01..1.0f64, 0.01..5.0f64),
    ) -> Rig {
        Rig::new()
            .source(&[
                ("c0", stall), ("c1", slope - 0.4), ("c2", 0.002), ("c3", -2e-5), ("most", most), ("breakdown_slip", slip),
                ("synchronous", 100.0), ("top_speed", 110.0), ("inertia", inertia.0),
            ])
            .stage(&[("ratio", ratio), ("forward", losses.0), ("backward", losses.1), ("drag", drag)])
            .stage(&[("ratio", second), ("forward", losses.1), ("backward", losses.0)])
            .load(&[
                ("weight", weight), ("c0", friction), ("c1", viscous), ("c2", square), ("power", power), ("from", 2.0),
                ("inertia", inertia.1),
            ])
    }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(120))]

    #[test]
    fn no_operating_point_is_missed(rig in drives()) {
        let drive = Assembly::new(&rig.spec).unwrap();
        let net = Net { drive: &drive, back: false };
        let found = crate::solve::points::meets(&drive, false);
        prop_assert!(found.undecided.is_none());
        let (near, _) = range(&drive);
        let steps: usize = 12_000;
        let at = |i: usize| f64::max(near, 3.0 * drive.scale * i as f64 / f64::from(12_000));
        for i in 0..steps {
            let (a, b) = (at(i), at(i + 1));
            let (before, after) = (net.eval(a), net.eval(b));
            if before * after < 0.0 {
                let inside = found.all.iter().filter(|m| m.x >= a && m.x <= b).count();
                prop_assert!(inside % 2 == 1, "{} .. {} {:?}", a, b, found.all);
            }
        }
        for meet in &found.all {
            let value = net.eval(meet.x).abs();
            prop_assert!(value <= 1e-9 * crate::solve::points::size(&drive, meet.x), "{:?} {}", meet, value);
        }
    }

    #[test]
    fn stable_and_unstable_points_take_turns(rig in drives()) {
        let points = rig.solved().points();
        for pair in points.windows(2) {
            let both = (pair[0].stability, pair[1].stability);
            let apart = both.0 != both.1 || both.0 == Stability::Marginal;
            prop_assert!(apart, "{:?}", points);
        }
    }

    #[test]
    fn power_in_is_power_out_and_losses(rig in drives()) {
        let solution = rig.solved();
        for state in &solution.points {
            let drive = &solution.drive;
            let given = state.source_power(drive);
            let load = &drive.loads[0];
            let taken = state.flow.loads[0] * state.x * drive.shafts[load.at.shaft].speed;
            let mut lost = 0.0;
            for (stage, through) in drive.stages.iter().zip(&state.flow.through) {
                let input = (through.input + through.hold) * state.x * drive.shafts[stage.at.input].speed;
                let output = through.output * state.x * drive.shafts[stage.at.output].speed;
                let loss = input - output;
                prop_assert!(loss >= -1e-9 * input.abs(), "a stage gains power: {} {}", input, output);
                lost += loss;
            }
            let size = given.abs() + taken.abs() + lost;
            prop_assert!((given - taken - lost).abs() <= 1e-8 * size, "{} {} {}", given, taken, lost);
        }
    }

    #[test]
    fn a_chain_is_its_product(rig in drives(), a in 0.3..4.0f64, b in 0.3..4.0f64, e in 0.6..1.0f64, f in 0.6..1.0f64) {
        let source = |rig: &Rig| rig.spec.parts[0].values.clone();
        let load = |rig: &Rig| rig.spec.parts[3].values.clone();
        let two = Rig::new()
            .source_of(source(&rig))
            .stage(&[("ratio", a), ("forward", e), ("backward", f)])
            .stage(&[("ratio", b), ("forward", f), ("backward", e)])
            .load_of(load(&rig));
        let one = Rig::new()
            .source_of(source(&rig))
            .stage(&[("ratio", a * b), ("forward", e * f), ("backward", e * f)])
            .load_of(load(&rig));
        let (two, one) = (two.solved(), one.solved());
        prop_assert_eq!(two.outcome(), one.outcome());
        let (p, q) = (two.points(), one.points());
        prop_assert_eq!(p.len(), q.len());
        for (p, q) in p.iter().zip(&q) {
            prop_assert!((p.speed - q.speed).abs() <= 1e-6 * q.speed.abs() + 1e-9, "{:?} {:?}", p, q);
        }
        if let (Ok(s), Ok(t)) = (number(&two, None, "run_up_time"), number(&one, None, "run_up_time")) {
            prop_assert!((s - t).abs() <= 1e-6 * t, "{} {}", s, t);
        }
    }

    #[test]
    fn twice_is_the_same_to_the_bit(rig in drives()) {
        let (a, b) = (rig.solved(), rig.solved());
        let bits = |s: &crate::Solution| {
            s.points().iter().flat_map(|p| [p.speed.to_bits(), p.source_effort.to_bits()]).collect::<Vec<_>>()
        };
        prop_assert_eq!(bits(&a), bits(&b));
        for name in ["run_up_time", "stop_time", "run_up_reserve", "peak_power", "efficiency"] {
            prop_assert_eq!(a.answer(None, None, name), b.answer(None, None, name));
        }
    }

    #[test]
    fn the_reached_point_is_the_first_above_rest(rig in drives()) {
        let solution = rig.solved();
        if let Some(reached) = solution.reached().filter(|p| p.mode != Mode::DrivenBack) {
            let first = solution.points()[0];
            prop_assert_eq!(reached.speed.to_bits(), first.speed.to_bits());
            prop_assert!(first.stability != Stability::Unstable);
        }
    }

    #[test]
    fn nothing_panics(
        stall in prop::num::f64::ANY, slope in prop::num::f64::ANY, ratio in prop::num::f64::ANY,
        weight in prop::num::f64::ANY, top in prop::num::f64::ANY, inertia in prop::num::f64::ANY,
    ) {
        let rig = Rig::new()
            .source(&[("c0", stall), ("c1", slope), ("top_speed", top), ("inertia", inertia)])
            .stage(&[("ratio", ratio), ("brake", weight), ("apply_time", inertia)])
            .load(&[("weight", weight), ("c2", slope), ("inertia", inertia)]);
        if let Ok(solution) = solve(&rig.spec) {
            for name in ["speed", "power", "run_up_time", "stop_time", "run_up_reserve", "peak_power", "highest_speed"] {
                let _ = solution.answer(None, None, name);
                let _ = solution.answer(Some(0), None, name);
                let _ = solution.answer(Some(1), None, name);
            }
        }
    }
}
