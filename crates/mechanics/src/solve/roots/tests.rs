//! No zero missed: against known zeros and a dense scan.

use super::{Crossing, Found, Task};
use crate::curve::{Curve, Law};
use crate::scalar::Real;
use proptest::prelude::*;

struct Polynomial(Vec<f64>);

impl Law for Polynomial {
    fn eval<R: Real>(&self, x: R) -> R {
        self.0.iter().rev().fold(R::of(0.0), |sum, c| sum * x + *c)
    }
}

/// A polynomial with these zeros.
fn with_zeros(zeros: &[f64]) -> Polynomial {
    let mut c = vec![1.0];
    for zero in zeros {
        let mut next = vec![0.0; c.len() + 1];
        for (i, value) in c.iter().enumerate() {
            next[i + 1] += value;
            next[i] -= zero * value;
        }
        c = next;
    }
    Polynomial(c)
}

fn search(curve: &dyn Curve, size: f64, from: f64, to: f64) -> Found {
    Task { curve, size: &|_| size }.roots_cut(from, to, &[])
}

#[test]
fn simple_double_and_triple_zeros() {
    let found = search(&with_zeros(&[1.0, 2.0]), 1.0, 0.0, 10.0);
    assert_eq!(found.roots.len(), 2, "{found:?}");
    assert_eq!(found.roots[0].crossing, Crossing::Falling);
    assert_eq!(found.roots[1].crossing, Crossing::Rising);
    assert!((found.roots[0].x - 1.0).abs() < 1e-14 && (found.roots[1].x - 2.0).abs() < 1e-14);

    let found = search(&with_zeros(&[3.0, 3.0]), 9.0, 0.0, 10.0);
    assert_eq!(found.roots.len(), 1, "{found:?}");
    assert_eq!(found.roots[0].crossing, Crossing::Touching);
    assert!((found.roots[0].x - 3.0).abs() < 1e-6);

    let found = search(&with_zeros(&[3.0, 3.0, 3.0]), 27.0, 0.0, 10.0);
    assert_eq!(found.roots.len(), 1, "{found:?}");
    assert_eq!(found.roots[0].crossing, Crossing::Rising);
}

#[test]
fn zeros_at_the_ends_count_once() {
    let found = search(&with_zeros(&[0.0, 4.0]), 4.0, 0.0, 4.0);
    let places: Vec<_> = found.roots.iter().map(|r| r.x).collect();
    assert_eq!(places, vec![0.0, 4.0]);
}

#[test]
fn a_level_stretch_is_one_place() {
    struct Level;
    impl Law for Level {
        fn eval<R: Real>(&self, x: R) -> R {
            x.piecewise(&[1.0, 2.0], |i, x| match i {
                0 => R::of(1.0) - x,
                1 => R::of(0.0),
                _ => R::of(2.0) - x,
            })
        }
    }
    let found = search(&Level, 1.0, 0.0, 5.0);
    assert_eq!(found.roots.len(), 1, "{found:?}");
    assert_eq!(found.roots[0].crossing, Crossing::Falling);
    assert!((found.roots[0].x - 1.0).abs() < 1e-6);
    assert!(found.undecided.is_none());
}

#[test]
fn what_cannot_be_decided_is_said() {
    struct Nothing;
    impl Law for Nothing {
        fn eval<R: Real>(&self, x: R) -> R {
            x / (x - x)
        }
    }
    assert!(search(&Nothing, 1.0, 1.0, 2.0).undecided.is_some());
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(200))]
    #[test]
    fn every_zero_is_found(mut zeros in prop::collection::vec(0.05..9.5f64, 0..6)) {
        zeros.sort_by(f64::total_cmp);
        prop_assume!(zeros.windows(2).all(|w| w[1] - w[0] > 0.02));
        let found = search(&with_zeros(&zeros), 1.0, 0.0, 10.0);
        prop_assert!(found.undecided.is_none());
        prop_assert_eq!(found.roots.len(), zeros.len(), "{:?}", found);
        for (root, zero) in found.roots.iter().zip(&zeros) {
            prop_assert!((root.x - zero).abs() < 1e-6, "{:?} {}", root, zero);
        }
    }

    #[test]
    fn a_dense_scan_finds_no_more(a in -2.0..2.0f64, b in -2.0..2.0f64, c in 0.3..9.0f64, d in 0.0..3.0f64) {
        struct Wave(f64, f64, f64, f64);
        impl Law for Wave {
            fn eval<R: Real>(&self, x: R) -> R {
                (x * self.2 + self.3).sin() + x * self.0 * 0.2 + self.1
            }
        }
        let wave = Wave(a, b, c, d);
        let found = search(&wave, 4.0, 0.0, 10.0);
        let steps = 20_000;
        let at = |i: usize| 10.0 * i as f64 / steps as f64;
        let changes: Vec<f64> = (0..steps)
            .filter(|i| (wave.at(at(*i)) > 0.0) != (wave.at(at(i + 1)) > 0.0))
            .map(at)
            .collect();
        let crossings = found.roots.iter().filter(|r| r.crossing != Crossing::Touching).count();
        prop_assert!(crossings >= changes.len(), "{:?} {:?}", found, changes);
        for x in changes {
            prop_assert!(found.roots.iter().any(|r| (r.x - x).abs() < 2e-3), "{} {:?}", x, found);
        }
    }
}
