//! Operating points, beside the bare loop that somebody would write by hand for one drive, in the same run.
//!
//! The solver finds every crossing, follows the drive from rest and keeps what is asked of it later; the bare loops
//! find one speed. What is compared is the price of the whole against the least there can be.

use divan::counter::ItemsCount;
use divan::{Bencher, black_box};
use layshaft_mechanics::drive::{Chain, DriveSpec, PartSpec, Settings};
use layshaft_mechanics::registry::{Role, row};
use layshaft_mechanics::solve::solve;
use layshaft_mechanics::values::{FieldValue, Values};

const DRIVES: usize = 1_000;
const REDUCTION: f64 = 2.75;
const EFFICIENCY: f64 = 0.955;

fn main() {
    divan::main();
}

/// A straight line: stall torque N·m, no-load speed rad/s, load N·m/(rad/s)².
#[derive(Clone, Copy)]
struct Straight {
    stall: f64,
    no_load: f64,
    load: f64,
}

/// An induction motor by Kloss's formula: breakdown torque N·m and slip, synchronous speed rad/s, load as above.
#[derive(Clone, Copy)]
struct Curved {
    breakdown: f64,
    slip: f64,
    synchronous: f64,
    load: f64,
}

fn straight() -> Vec<Straight> {
    let one = |n: usize| Straight { stall: 30.0 + n as f64 * 0.02, no_load: 312.0, load: 1.2e-3 };
    (0..DRIVES).map(one).collect()
}

fn curved() -> Vec<Curved> {
    // 1440 rpm at 50 Hz and four poles: slip 4 %, breakdown at k = 2.9.
    let slip = 0.04 * (2.9 + (2.9_f64 * 2.9 - 1.0).sqrt());
    let synchronous = 50.0 * std::f64::consts::PI;
    let rated = |power: f64| power / (synchronous * 0.96);
    let one = |n: usize| Curved { breakdown: 2.9 * rated(power(n)), slip, synchronous, load: 0.015 };
    (0..DRIVES).map(one).collect()
}

fn power(n: usize) -> f64 {
    4_000.0 + n as f64
}

/// The positive root of `e i (T - T i w / w0) = c w²`.
fn closed_form(drive: &Straight) -> f64 {
    let a = EFFICIENCY * REDUCTION * drive.stall;
    let b = a * REDUCTION / drive.no_load;
    2.0 * a / (b + (b * b + 4.0 * drive.load * a).sqrt())
}

/// Newton's method kept inside a bracket, between breakdown and the synchronous speed.
fn newton(drive: &Curved) -> f64 {
    let synchronous = drive.synchronous / REDUCTION;
    let (mut low, mut high) = (synchronous * (1.0 - drive.slip), synchronous);
    let scale = 2.0 * drive.breakdown * REDUCTION * EFFICIENCY;
    let mut w = high;
    for _ in 0..60 {
        let s = (1.0 - w / synchronous) / drive.slip;
        let below = 1.0 + s * s;
        let net = scale * s / below - drive.load * w * w;
        let slope =
            -scale * (1.0 - s * s) / (below * below * drive.slip * synchronous) - 2.0 * drive.load * w;
        if net > 0.0 {
            low = w
        } else {
            high = w
        }
        let next = w - net / slope;
        let next = if next > low && next < high { next } else { 0.5 * (low + high) };
        if (next - w).abs() <= 1e-14 * synchronous {
            return next;
        }
        w = next;
    }
    w
}

fn part(role: Role, kind: &str, fields: &[(&'static str, f64)]) -> PartSpec {
    let mut values = Values::default();
    fields.iter().for_each(|(name, si)| values.set(name, FieldValue::Si(*si)));
    let row = row(role, kind).expect("the kind is in the registry");
    PartSpec { name: String::from(kind), row, values, on: true }
}

fn drive(source: PartSpec, load: f64) -> DriveSpec {
    let gear = part(Role::Transmission, "gear", &[("reduction", REDUCTION), ("efficiency", EFFICIENCY)]);
    let load = part(Role::Load, "quadratic", &[("torque_coefficient", load)]);
    let station = |index| Chain::Part { index, count: 1 };
    let chain = Chain::Series((0..3).map(station).collect());
    DriveSpec { parts: vec![source, gear, load], chain, settings: Settings::default() }
}

fn straight_drive(of: &Straight) -> DriveSpec {
    let fields = [("stall_torque", of.stall), ("no_load_speed", of.no_load)];
    drive(part(Role::Source, "straight_line", &fields), of.load)
}

fn curved_drive(n: usize, of: &Curved) -> DriveSpec {
    let times = |times| FieldValue::OfRated(times);
    let mut source = part(
        Role::Source,
        "induction_motor",
        &[
            ("rated_power", power(n)),
            ("rated_speed", of.synchronous * 0.96),
            ("rated_voltage", 400.0),
            ("rated_frequency", 50.0),
            ("poles", 4.0),
        ],
    );
    source.values.set("breakdown_torque", times(2.9));
    source.values.set("locked_rotor_torque", times(2.3));
    source.values.set("pull_up_torque", times(1.9));
    source.values.set("supply", FieldValue::Part(3));
    let mut spec = drive(source, of.load);
    spec.parts.push(part(Role::Supply, "mains", &[("voltage", 400.0), ("frequency", 50.0)]));
    spec
}

/// The reached speed of a drive, as the solver finds it.
fn solved(spec: &DriveSpec) -> f64 {
    match solve(spec).map(|solution| solution.reached()) {
        Ok(Some(point)) => point.speed,
        Ok(None) => panic!("the drive reaches no point"),
        Err(faults) => panic!("{faults:?}"),
    }
}

/// Both sides answer the same.
fn agree(ours: f64, bare: f64) {
    assert!((ours / bare - 1.0).abs() < 1e-9, "the solver says {ours} rad/s, the bare loop {bare}");
}

#[divan::bench]
fn baseline_straight_line(bencher: Bencher) {
    let drives = straight();
    let all = || black_box(&drives).iter().map(closed_form).sum::<f64>();
    bencher.counter(ItemsCount::new(DRIVES)).bench_local(all);
}

#[divan::bench]
fn straight_line(bencher: Bencher) {
    let drives = straight();
    let specs: Vec<DriveSpec> = drives.iter().map(straight_drive).collect();
    specs.iter().zip(&drives).for_each(|(spec, bare)| agree(solved(spec), closed_form(bare)));
    let all = || black_box(&specs).iter().map(solved).sum::<f64>();
    bencher.counter(ItemsCount::new(DRIVES)).bench_local(all);
}

#[divan::bench]
fn baseline_curved(bencher: Bencher) {
    let drives = curved();
    let all = || black_box(&drives).iter().map(newton).sum::<f64>();
    bencher.counter(ItemsCount::new(DRIVES)).bench_local(all);
}

#[divan::bench]
fn curved_line(bencher: Bencher) {
    let drives = curved();
    let specs: Vec<DriveSpec> = drives.iter().enumerate().map(|(n, bare)| curved_drive(n, bare)).collect();
    specs.iter().zip(&drives).for_each(|(spec, bare)| agree(solved(spec), newton(bare)));
    let all = || black_box(&specs).iter().map(solved).sum::<f64>();
    bencher.counter(ItemsCount::new(DRIVES)).bench_local(all);
}
