//! What the tests of the loads share.

use crate::fault::Fault;
use crate::model::{Load, Model, Own};

/// A load that was built.
#[track_caller]
pub(super) fn loaded(found: Result<Model, Vec<Fault>>) -> Box<dyn Load> {
    match found {
        Ok(Model::Load(load)) => load,
        other => panic!("{other:?}"),
    }
}

/// A result of its own at a speed.
#[track_caller]
pub(super) fn result(load: &dyn Load, name: &str, speed: f64) -> f64 {
    match load.own(name) {
        Some(Own::Law { curve, .. }) => curve.at(speed),
        other => panic!("{name}: {other:?}"),
    }
}
