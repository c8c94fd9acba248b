//! A million drives: the kernels of the typed door beside the bare loops that somebody would write by hand, in the
//! same run.

use divan::counter::ItemsCount;
use divan::{Bencher, black_box};
use layshaft_mechanics::curve::Law;
use layshaft_mechanics::laws::kloss;
use layshaft_mechanics::scalar::Real;
use layshaft_mechanics::typed::{
    Quadratic, Sole, StraightLine, sole_operating_point, straight_lines_against_quadratics,
};
use uom::si::angular_velocity::radian_per_second;
use uom::si::f64::{AngularVelocity, Torque};
use uom::si::torque::newton_meter;

const DRIVES: usize = 1_000_000;

fn main() {
    divan::main();
}

fn rads(value: f64) -> AngularVelocity {
    AngularVelocity::new::<radian_per_second>(value)
}

/// Stall torque, no-load speed and load coefficient of every drive.
fn numbers() -> Vec<(f64, f64, f64)> {
    let one = |n: usize| (1.0 + n as f64 * 1e-5, 250.0 + (n % 97) as f64, 1e-4 + (n % 31) as f64 * 1e-5);
    (0..DRIVES).map(one).collect()
}

#[divan::bench(sample_count = 20)]
fn baseline_straight_lines(bencher: Bencher) {
    let numbers = numbers();
    let (stall, (no_load, load)): (Vec<f64>, (Vec<f64>, Vec<f64>)) =
        numbers.into_iter().map(|(t, w, c)| (t, (w, c))).unzip();
    let mut speeds = vec![0.0; DRIVES];
    bencher.counter(ItemsCount::new(DRIVES)).bench_local(|| {
        let drives = black_box(&stall).iter().zip(&no_load).zip(&load);
        for (((stall, no_load), load), speed) in drives.zip(&mut speeds) {
            let b = stall / no_load;
            *speed = 2.0 * stall / (b + (b * b + 4.0 * load * stall).sqrt());
        }
        black_box(&speeds);
    });
}

#[divan::bench(sample_count = 20)]
fn straight_lines(bencher: Bencher) {
    let made = |(t, w, c): (f64, f64, f64)| {
        let source = StraightLine::new(Torque::new::<newton_meter>(t), rads(w)).expect("above zero");
        let load = Quadratic::through(Torque::new::<newton_meter>(c), rads(1.0)).expect("above zero");
        (source, load)
    };
    let (sources, loads): (Vec<_>, Vec<_>) = numbers().into_iter().map(made).unzip();
    let mut speeds = vec![rads(0.0); DRIVES];
    bencher.counter(ItemsCount::new(DRIVES)).bench_local(|| {
        straight_lines_against_quadratics(black_box(&sources), &loads, &mut speeds);
        black_box(&speeds);
    });
}

/// An induction machine by Kloss's formula.
struct Machine {
    breakdown: f64,
    slip: f64,
    synchronous: f64,
}

impl Law for Machine {
    fn eval<R: Real>(&self, speed: R) -> R {
        let slip = (R::of(self.synchronous) - speed) * (1.0 / self.synchronous);
        kloss::torque(self.breakdown, self.slip, slip)
    }
}

/// The same, its formula written out by somebody who does not know the law.
struct WrittenOut<'a>(&'a Machine);

impl Law for WrittenOut<'_> {
    fn eval<R: Real>(&self, speed: R) -> R {
        let s = (R::of(self.0.synchronous) - speed) * (1.0 / (self.0.synchronous * self.0.slip));
        s * (2.0 * self.0.breakdown) / (s.square() + 1.0)
    }
}

struct Fan(f64);

impl Law for Fan {
    fn eval<R: Real>(&self, speed: R) -> R {
        speed.square() * self.0
    }
}

const CURVED: usize = 100_000;

fn curved() -> Vec<(Machine, Fan)> {
    let one = |n: usize| {
        let machine = Machine { breakdown: 60.0 + n as f64 * 1e-4, slip: 0.2, synchronous: 157.0 };
        (machine, Fan(5e-4 + (n % 31) as f64 * 1e-5))
    };
    (0..CURVED).map(one).collect()
}

/// Newton's method kept inside a bracket, on a net torque that falls; `net` gives its value and slope.
#[inline(always)]
fn safeguarded((mut low, mut high): (f64, f64), net: impl Fn(f64) -> (f64, f64)) -> f64 {
    let mut w = 0.5 * (low + high);
    for _ in 0..60 {
        let (value, slope) = net(w);
        if value > 0.0 {
            low = w;
        } else {
            high = w;
        }
        let step = w - value / slope;
        if (step - w).abs() <= 1e-14 * w {
            return step;
        }
        w = if step > low && step < high { step } else { 0.5 * (low + high) };
    }
    w
}

fn newton(machine: &Machine, fan: &Fan) -> f64 {
    safeguarded((machine.synchronous * (1.0 - machine.slip), machine.synchronous), |w| {
        let s = (machine.synchronous - w) / (machine.synchronous * machine.slip);
        let below = 1.0 + s * s;
        let net = 2.0 * machine.breakdown * s / below - fan.0 * w * w;
        let slope = -2.0 * machine.breakdown * (1.0 - s * s)
            / (below * below * machine.slip * machine.synchronous)
            - 2.0 * fan.0 * w;
        (net, slope)
    })
}

#[divan::bench(sample_count = 20)]
fn baseline_curved(bencher: Bencher) {
    let drives = curved();
    let all = || black_box(&drives).iter().map(|(machine, fan)| newton(machine, fan)).sum::<f64>();
    bencher.counter(ItemsCount::new(CURVED)).bench_local(all);
}

/// The speed of the one operating point between breakdown and synchronous speed, proved to be the only one.
fn proved(law: &impl Law, machine: &Machine, fan: &Fan) -> f64 {
    let range = (rads(machine.synchronous * (1.0 - machine.slip)), rads(machine.synchronous));
    match sole_operating_point(law, fan, range) {
        Sole::Stable(point) => point.speed.get::<radian_per_second>(),
        other => panic!("{other:?}"),
    }
}

fn all_proved(bencher: Bencher, one: impl Fn(&(Machine, Fan)) -> f64) {
    let drives = curved();
    for drive in drives.iter().step_by(1000) {
        let (ours, bare) = (one(drive), newton(&drive.0, &drive.1));
        assert!((ours / bare - 1.0).abs() < 1e-12, "{ours} {bare}");
    }
    let all = || black_box(&drives).iter().map(&one).sum::<f64>();
    bencher.counter(ItemsCount::new(CURVED)).bench_local(all);
}

#[divan::bench(sample_count = 20)]
fn curved_proved(bencher: Bencher) {
    all_proved(bencher, |(machine, fan)| proved(machine, machine, fan));
}

#[divan::bench(sample_count = 20)]
fn curved_written_out_proved(bencher: Bencher) {
    all_proved(bencher, |(machine, fan)| proved(&WrittenOut(machine), machine, fan));
}

/// A straight line behind a gear, seen at its output.
struct Geared {
    standstill: f64,
    end: f64,
}

impl Law for Geared {
    fn eval<R: Real>(&self, speed: R) -> R {
        (R::of(self.end) - speed) * (self.standstill / self.end)
    }
}

/// A load without closed form: a constant, a power of 1.8, and what sticks and fades.
struct Rough {
    constant: f64,
    power: f64,
    sticks: f64,
    fades: f64,
}

impl Law for Rough {
    fn eval<R: Real>(&self, speed: R) -> R {
        speed.powf(1.8) * self.power + (speed * (-1.0 / self.fades)).exp() * self.sticks + self.constant
    }
}

fn rough() -> Vec<(Geared, Rough)> {
    let one = |n: usize| {
        let share = 1.0 + (n % 97) as f64 * 1e-3;
        let load = Rough { constant: 0.2 * share, power: 1e-3, sticks: 0.15, fades: 5.0 };
        (Geared { standstill: 1.575 + n as f64 * 1e-7, end: 62.8 }, load)
    };
    (0..CURVED).map(one).collect()
}

fn newton_rough(source: &Geared, load: &Rough) -> f64 {
    safeguarded((0.0, source.end), |w| {
        let power = load.power * libm::pow(w, 1.8);
        let faded = load.sticks * libm::exp(-w / load.fades);
        let net = (source.end - w) * source.standstill / source.end - load.constant - power - faded;
        let slope = -source.standstill / source.end - 1.8 * power / w + faded / load.fades;
        (net, slope)
    })
}

#[divan::bench(sample_count = 20)]
fn baseline_rough(bencher: Bencher) {
    let drives = rough();
    let all = || black_box(&drives).iter().map(|(source, load)| newton_rough(source, load)).sum::<f64>();
    bencher.counter(ItemsCount::new(CURVED)).bench_local(all);
}

#[divan::bench(sample_count = 20)]
fn rough_proved(bencher: Bencher) {
    let drives = rough();
    let one = |(source, load): &(Geared, Rough)| match sole_operating_point(
        source,
        load,
        (rads(0.0), rads(source.end)),
    ) {
        Sole::Stable(point) => point.speed.get::<radian_per_second>(),
        other => panic!("{other:?}"),
    };
    for (source, load) in drives.iter().step_by(1000) {
        let (ours, bare) = (one(&(Geared { ..*source }, Rough { ..*load })), newton_rough(source, load));
        assert!((ours / bare - 1.0).abs() < 1e-12, "{ours} {bare}");
    }
    let all = || black_box(&drives).iter().map(one).sum::<f64>();
    bencher.counter(ItemsCount::new(CURVED)).bench_local(all);
}
