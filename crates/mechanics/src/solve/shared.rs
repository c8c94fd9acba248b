//! Different sources on one supply that sags: each pulls down the voltage of all.
//!
//! At a speed of the drive the terminal voltage U is where `U + R Σ n I(U)` is the open-circuit voltage, I being what
//! a machine takes at full command on a stiff U. A higher voltage never gives a machine less effort; with that, bounds
//! over a range of speeds follow from the bounds at the ends of the range of voltages. Below half the open-circuit
//! voltage a supply gives less power, not more: a machine that would need that is followed down to where it runs.

use std::sync::Arc;

use super::assembly::Assembly;
use super::bracket::bracketed;
use super::chain::Hung;
use crate::curve::Curve;
use crate::fault::{Fault, FaultKind, Note};
use crate::model::{Braking, Characteristic, Draw, Drawn, Feed, Model, SupplyData};
use crate::registry::Role;
use crate::scalar::{Dual, Enclosure, Interval};
use crate::values::FieldValue;

/// One of the sources.
#[derive(Clone)]
pub(crate) struct Member {
    /// Its place among the sources of the drive.
    pub source: usize,
    /// Its model.
    pub model: Arc<Model>,
    /// What it hangs on.
    pub feed: Feed,
    /// Its number of machines.
    pub count: f64,
    /// Its speed per speed of the root.
    pub speed: f64,
}

impl Member {
    /// The machine on a stiff voltage.
    fn on(&self, voltage: f64) -> Option<(Characteristic, Box<dyn Draw>)> {
        let Model::Source(model) = self.model.as_ref() else { return None };
        let supply = self.feed.supply.map(|data| SupplyData {
            voltage: Some(voltage),
            resistance: Some(0.0),
            current_limit: None,
            ..data
        });
        let feed = Feed { supply, machines: 1.0, ..self.feed };
        Some((model.characteristic(&feed).ok()?, model.draw(&feed)?))
    }

    /// What it takes at a voltage, a speed of its own and an effort.
    fn drawn(&self, voltage: f64, speed: f64, effort: f64) -> Drawn<f64> {
        self.on(voltage).map_or(Drawn::NOTHING, |(_, draw)| draw.at(speed, effort))
    }
}

/// All sources on one supply.
#[derive(Clone)]
pub(crate) struct Group {
    /// The sources.
    pub members: Vec<Member>,
    /// Open-circuit voltage.
    pub voltage: f64,
    /// Resistance of the supply.
    pub resistance: f64,
}

/// Effort at full command with its sign as the machine takes part.
fn effort(character: &Characteristic, speed: f64) -> f64 {
    let raw = character.drive.at(speed);
    if matches!(character.braking, Braking::Can(_)) { raw } else { f64::max(raw, 0.0) }
}

/// The same over a range of speeds.
fn effort_over(character: &Characteristic, speed: Enclosure) -> Interval {
    let raw = character.drive.over(speed).value;
    if matches!(character.braking, Braking::Can(_)) {
        raw
    } else {
        Interval { lo: f64::max(raw.lo, 0.0), hi: f64::max(raw.hi, 0.0) }
    }
}

impl Group {
    /// Whether every source knows the current it takes.
    pub fn knows_currents(&self) -> bool {
        let knows = |m: &Member| m.drawn(self.voltage, 0.0, 0.0).supply_current.is_some();
        self.members.iter().all(knows)
    }

    /// The voltage at which `current(U)`, what all take together, is what the supply gives.
    fn settled(&self, current: impl Fn(f64) -> f64) -> f64 {
        let short = |voltage: f64| voltage + self.resistance * current(voltage) - self.voltage;
        let half = 0.5 * self.voltage;
        if short(half) > 0.0 {
            return bracketed(short, 1e-6 * self.voltage, half);
        }
        bracketed(short, half, 2.0 * self.voltage)
    }

    /// Terminal voltage at full command at speed `x` of the root.
    fn full(&self, x: f64) -> f64 {
        self.settled(|voltage| {
            let each = self.members.iter().map(|m| {
                let Some((character, draw)) = m.on(voltage) else { return 0.0 };
                let speed = x * m.speed;
                m.count * draw.at(speed, effort(&character, speed)).supply_current.unwrap_or(0.0)
            });
            each.sum()
        })
    }

    /// Terminal voltage while the machines give these efforts.
    fn at_efforts(&self, x: f64, efforts: &[f64]) -> f64 {
        self.settled(|voltage| {
            let each = self.members.iter().zip(efforts);
            each.map(|(m, effort)| {
                m.count * m.drawn(voltage, x * m.speed, *effort).supply_current.unwrap_or(0.0)
            })
            .sum()
        })
    }

    /// What member `index` takes while the sources of the drive give these efforts.
    pub fn drawn(&self, index: usize, x: f64, of_all: &[f64]) -> Drawn<f64> {
        let efforts: Vec<f64> = self.members.iter().map(|m| of_all[m.source]).collect();
        let voltage = self.at_efforts(x, &efforts);
        let member = &self.members[index];
        member.drawn(voltage, x * member.speed, efforts[index])
    }

    /// Bounds on the terminal voltage at full command over a range of speeds of the root.
    fn full_over(&self, x: Interval) -> Interval {
        let short = |voltage: f64| {
            let mut sum = Interval::point(0.0);
            for m in &self.members {
                let Some((character, draw)) = m.on(voltage) else { return Interval::ENTIRE };
                let held = Enclosure { value: x.times(m.speed), slope: Interval::ZERO };
                let given = effort_over(&character, held);
                let taken = draw.over(held, Enclosure { value: given, slope: Interval::ZERO });
                let Some(current) = taken.supply_current else { return Interval::ENTIRE };
                sum = sum + current.value.times(m.count);
            }
            Interval::point(voltage) + sum.times(self.resistance) - Interval::point(self.voltage)
        };
        // The shortfall rises with the voltage: where its bounds are of one sign the voltage is not.
        let end = |outside: &dyn Fn(Interval) -> bool, mut out: f64, mut inside: f64| {
            for _ in 0..24 {
                let middle = 0.5 * out + 0.5 * inside;
                if outside(short(middle)) {
                    out = middle;
                } else {
                    inside = middle;
                }
            }
            out
        };
        let (bottom, top) = (1e-6 * self.voltage, 2.0 * self.voltage);
        Interval::new(end(&|s| s.hi < 0.0, bottom, top), end(&|s| s.lo > 0.0, top, bottom))
    }
}

/// What one of them gives at full command, all at full command.
pub(crate) struct Coupled {
    /// All of them.
    pub group: Arc<Group>,
    /// Which one.
    pub index: usize,
}

impl Curve for Coupled {
    fn at(&self, speed: f64) -> f64 {
        let member = &self.group.members[self.index];
        let voltage = self.group.full(speed / member.speed);
        member.on(voltage).map_or(0.0, |(character, _)| character.drive.at(speed))
    }

    fn over(&self, speed: Enclosure) -> Enclosure {
        let member = &self.group.members[self.index];
        let voltages = self.group.full_over(speed.value / Interval::point(member.speed));
        let at = |voltage: f64| member.on(voltage).map(|(character, _)| character.drive.over(speed).value);
        let (Some(low), Some(high)) = (at(voltages.lo), at(voltages.hi)) else {
            return Enclosure { value: Interval::ENTIRE, slope: Interval::ENTIRE };
        };
        Enclosure { value: low.hull(high), slope: Interval::ENTIRE }
    }

    /// The slope only polishes what bounds have settled: a difference does.
    fn dual(&self, speed: Dual) -> Dual {
        let step = 1e-6 * (speed.value.abs() + 1.0);
        let rate = (self.at(speed.value + step) - self.at(speed.value - step)) / (2.0 * step);
        Dual { value: self.at(speed.value), slope: rate * speed.slope }
    }

    fn jumps(&self) -> Vec<f64> {
        let member = &self.group.members[self.index];
        member.on(self.group.voltage).map(|(character, _)| character.drive.jumps()).unwrap_or_default()
    }

    fn kinks(&self) -> Vec<f64> {
        Vec::new()
    }
}

/// What becomes of the sources on their supplies, one each in the order of the drive.
pub(crate) enum Hangs {
    /// As if alone, with this number of equal machines.
    Alone(f64),
    /// Coupled with others.
    Coupled(Arc<Group>, usize),
}

/// Sorts out who pulls down whom.
pub(crate) fn sort_out(drive: &Assembly) -> Result<Vec<Hangs>, Vec<Fault>> {
    let sources = &drive.tree.sources;
    let mut out: Vec<Hangs> = sources.iter().map(|at| Hangs::Alone(at.count)).collect();
    let mut faults = Vec::new();
    for (index, part) in drive.spec.parts.iter().enumerate() {
        if part.row.role != Role::Supply {
            continue;
        }
        let on_it = |at: &&Hung| {
            let names = matches!(drive.spec.parts[at.part].values.get("supply"), Some(FieldValue::Part(p)) if *p == index);
            names && drive.spec.parts[at.part].on
        };
        let hung: Vec<usize> = (0..sources.len()).filter(|i| on_it(&&sources[*i])).collect();
        let Model::Supply(supply) = drive.models[index].as_ref() else { continue };
        let data = supply.data();
        let limited = data.current_limit.is_some() || data.flow_limit.is_some();
        let stiff = data.resistance.unwrap_or(0.0) == 0.0 && !limited;
        if hung.len() < 2 || stiff {
            continue;
        }
        if hung.iter().all(|i| equal(drive, hung[0], *i)) {
            let machines = hung.iter().map(|i| sources[*i].count).sum();
            hung.iter().for_each(|i| out[*i] = Hangs::Alone(machines));
            continue;
        }
        match couple(drive, &hung, data) {
            Some(group) => {
                for (member, i) in hung.iter().enumerate() {
                    out[*i] = Hangs::Coupled(Arc::clone(&group), member);
                }
            }
            None => {
                let how = "different sources hang on a supply that limits its current or flow, or one of them does not know \
                           the current (or flow) it takes: how they share it is not settled by their data; give each its own \
                           supply, or declare this one stiff and without a limit";
                faults.push(Fault {
                    part: Some(sources[hung[1]].part),
                    kind: FaultKind::Unsettled { how: Note::plain(how) },
                });
            }
        }
    }
    if faults.is_empty() { Ok(out) } else { Err(faults) }
}

/// Whether two sources are the same machine at the same speed.
fn equal(drive: &Assembly, a: usize, b: usize) -> bool {
    let (a, b) = (&drive.tree.sources[a], &drive.tree.sources[b]);
    let (one, other) = (&drive.spec.parts[a.part], &drive.spec.parts[b.part]);
    let (v, w) = (drive.shafts[a.shaft].speed, drive.shafts[b.shaft].speed);
    std::ptr::eq(one.row, other.row) && one.values == other.values && (v - w).abs() <= 1e-12 * v
}

fn couple(drive: &Assembly, hung: &[usize], data: SupplyData) -> Option<Arc<Group>> {
    let (voltage, resistance) = (data.voltage?, data.resistance?);
    let member = |source: &usize| {
        let at = &drive.tree.sources[*source];
        Member {
            source: *source,
            model: Arc::clone(&drive.models[at.part]),
            feed: Feed {
                supply: Some(data),
                machines: 1.0,
                ambient: drive.spec.settings.ambient,
                altitude: drive.spec.settings.altitude,
            },
            count: at.count,
            speed: drive.shafts[at.shaft].speed,
        }
    };
    let group = Group { members: hung.iter().map(member).collect(), voltage, resistance };
    (data.current_limit.is_none() && data.frequency.is_none() && group.knows_currents())
        .then(|| Arc::new(group))
}
