//! A source in its place: what it hangs on, what it gives at full command, and how a set speed bounds it.

use std::sync::Arc;

use super::assembly::Assembly;
use super::chain::Hung;
use super::fluid::{Behind, misplaced, put_behind};
use super::ratings::derating;
use super::shared::{Coupled, Group, Hangs, sort_out};
use crate::fault::{Fault, FaultKind, Note};
use crate::model::{Braking, Characteristic, Draw, Feed, Model, Source, Supply, SupplyData};
use crate::scalar::Real;
use crate::values::FieldValue;

/// A source in place.
pub(crate) struct SourceAt {
    /// Where.
    pub at: Hung,
    /// Its supply, by part.
    pub supply: Option<usize>,
    /// What it hangs on.
    pub feed: Feed,
    /// What it gives; none when it is off.
    pub character: Option<Characteristic>,
    /// Its electrical side, where its supply is its own or stiff.
    pub draw: Option<Box<dyn Draw>>,
    /// The sources it shares a sagging supply with, and its place among them.
    pub coupled: Option<(Arc<Group>, usize)>,
    /// The fluid coupling behind it: it has a speed of its own.
    pub behind: Option<Arc<Behind>>,
    /// How a set speed bounds it.
    pub governor: Option<Governor>,
}

/// A set speed, at the source's shaft.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Governor {
    /// The speed without load.
    pub speed: f64,
    /// Effort per speed below the set speed; none for a vertical line.
    pub stiffness: Option<f64>,
}

impl SourceAt {
    /// Effort at full command, bounded by the set speed. Below its idle speed an engine idles on and pushes through
    /// its slipping clutch with what it gives at idle.
    pub fn effort<R: Real>(&self, speed: R) -> R {
        let Some(character) = &self.character else { return R::of(0.0) };
        let speed = match character.idle {
            Some(idle) => speed.max(R::of(idle)),
            None => speed,
        };
        match self.governor {
            None => natural(character, speed),
            Some(Governor { speed: set, stiffness: None }) => speed.piecewise(&[set], |piece, speed| {
                if piece == 0 { natural(character, speed) } else { -self.braking(speed) }
            }),
            Some(Governor { speed: set, stiffness: Some(stiffness) }) => {
                let line = (R::of(set) - speed) * stiffness;
                natural(character, speed).min(line.max(-self.braking(speed)))
            }
        }
    }

    /// Its own speed where its shaft would turn at `speed` under this effort: the same, but behind a fluid coupling.
    pub fn own_speed(&self, speed: f64, effort: f64) -> f64 {
        self.behind.as_ref().map_or(speed, |behind| behind.input_at(speed, effort))
    }

    /// The most it gives in the direction of motion, 0 or above.
    pub fn most<R: Real>(&self, speed: R) -> R {
        match &self.character {
            Some(character) => speed.on(character.drive.as_ref()).max(R::of(0.0)),
            None => R::of(0.0),
        }
    }

    /// The most it can hold back, 0 or above.
    pub fn braking<R: Real>(&self, speed: R) -> R {
        match self.character.as_ref().map(|c| &c.braking) {
            Some(Braking::Can(curve)) => speed.on(curve.as_ref()).max(R::of(0.0)),
            _ => R::of(0.0),
        }
    }

    /// The field that would have to say how it brakes.
    pub fn braking_unknown(&self) -> Option<&'static str> {
        match self.character.as_ref().map(|c| &c.braking) {
            Some(Braking::Unknown(field)) => Some(field),
            _ => None,
        }
    }

    /// Speeds at which its effort jumps.
    pub fn jumps(&self) -> Vec<f64> {
        let Some(character) = &self.character else { return Vec::new() };
        let mut jumps = character.drive.jumps();
        if let Some(governor) = self.governor {
            if let Braking::Can(curve) = &character.braking {
                jumps.extend(curve.jumps());
            }
            jumps.push(governor.speed);
        }
        jumps
    }

    /// Speeds at which its slope jumps.
    pub fn kinks(&self) -> Vec<f64> {
        self.character.as_ref().map(|c| c.drive.kinks()).unwrap_or_default()
    }
}

/// Effort at full command without a set speed.
fn natural<R: Real>(character: &Characteristic, speed: R) -> R {
    let raw = speed.on(character.drive.as_ref());
    match character.braking {
        Braking::Can(_) => raw,
        Braking::Cannot | Braking::Unknown(_) => raw.max(R::of(0.0)),
    }
}

/// Places all sources of a drive.
pub(crate) fn sources(drive: &Assembly) -> Result<Vec<SourceAt>, Vec<Fault>> {
    let mut placed = Vec::new();
    let mut faults = Vec::new();
    faults.extend(misplaced(drive));
    let mut followed = drive.set.is_none();
    for (at, hangs) in drive.tree.sources.iter().zip(sort_out(drive)?) {
        let supply = supply_of(drive, at.part);
        let feed = feed(drive, &hangs, supply);
        let mut source = SourceAt {
            at: *at,
            supply: supply.map(|(i, _)| i),
            feed,
            character: None,
            draw: None,
            coupled: None,
            behind: None,
            governor: None,
        };
        let Model::Source(model) = drive.models[at.part].as_ref() else { continue };
        if drive.spec.parts[at.part].on {
            match taken(drive, &source, model.as_ref()) {
                Ok(character) => {
                    followed |= character.follows_set_speed;
                    if let Hangs::Alone(_) = hangs {
                        source.draw = model.draw(&feed);
                    }
                    faults.extend(put_to_work(drive, &mut source, character, hangs));
                }
                Err(found) => {
                    faults.extend(found.into_iter().map(|f| Fault { part: f.part.or(Some(at.part)), ..f }));
                }
            }
        }
        placed.push(source);
    }
    if !followed && faults.is_empty() {
        let how = "a set speed is given, but no source of this drive follows one: a servo does, or a dc motor with \
                   the current_limit of its controller";
        faults.push(Fault { part: None, kind: FaultKind::Chain { how: Note::plain(how) } });
    }
    if faults.is_empty() { Ok(placed) } else { Err(faults) }
}

/// What a source gives in its place, or why it cannot stand there.
fn taken(drive: &Assembly, at: &SourceAt, model: &dyn Source) -> Result<Characteristic, Vec<Fault>> {
    derating(drive, at)?;
    let character = model.characteristic(&at.feed)?;
    let mut faults = Vec::new();
    if !character.reversible && drive.shafts[at.at.shaft].sense < 0.0 {
        let how = "this source runs one way only, and the drive asks for the other: put a reversing stage behind it";
        faults.push(Fault { part: None, kind: FaultKind::Chain { how: Note::plain(how) } });
    }
    if let (Some(field), None) = (character.needs_set_speed, drive.set) {
        let why = "an inverter runs its motor at a speed or a frequency that is set: the drive's set_speed, or this";
        let kind = FaultKind::Missing { any_of: vec![vec![field]], why: Note::plain(why) };
        faults.push(Fault { part: None, kind });
    }
    if faults.is_empty() { Ok(character) } else { Err(faults) }
}

/// Gives a source what it does where it stands: on a shared supply, before a fluid coupling, under a set speed.
fn put_to_work(
    drive: &Assembly,
    source: &mut SourceAt,
    mut character: Characteristic,
    hangs: Hangs,
) -> Option<Fault> {
    let at = source.at;
    if let Hangs::Coupled(group, index) = hangs {
        character.drive = Box::new(Coupled { group: Arc::clone(&group), index });
        source.coupled = Some((group, index));
    }
    match put_behind(drive, &at, character) {
        Ok((character, behind)) => {
            source.behind = behind;
            source.governor = governor(drive, &at, &character);
            source.character = Some(character);
            None
        }
        Err(fault) => Some(fault),
    }
}

/// The set speed at a source's shaft.
fn governor(drive: &Assembly, at: &Hung, character: &Characteristic) -> Option<Governor> {
    let set = drive.set.filter(|_| character.follows_set_speed)? * drive.shafts[at.shaft].speed;
    let own = character.droop.filter(|_| drive.spec.settings.droop == 0.0);
    let droop = own.unwrap_or(drive.spec.settings.droop);
    if droop <= 0.0 || droop.is_nan() {
        return Some(Governor { speed: set, stiffness: None });
    }
    // The line falls from full effort at its foot to none at the set speed.
    let full = character.drive.at(set * (1.0 - f64::min(droop, 1.0)));
    (full > 0.0).then_some(Governor { speed: set, stiffness: Some(full / (droop * set)) })
}

/// The supply named in a source's field, and its model.
fn supply_of(drive: &Assembly, part: usize) -> Option<(usize, &dyn Supply)> {
    let Some(FieldValue::Part(index)) = drive.spec.parts[part].values.get("supply") else { return None };
    match drive.models.get(*index)?.as_ref() {
        Model::Supply(model) => Some((*index, model.as_ref())),
        _ => None,
    }
}

/// What a source sees; one that shares a supply with different ones starts from its open-circuit voltage.
fn feed(drive: &Assembly, hangs: &Hangs, supply: Option<(usize, &dyn Supply)>) -> Feed {
    let data = supply.map(|(_, model)| model.data());
    let (data, machines) = match hangs {
        Hangs::Alone(machines) => (data, *machines),
        Hangs::Coupled(..) => (data.map(|d| SupplyData { resistance: Some(0.0), ..d }), 1.0),
    };
    Feed {
        supply: data,
        machines,
        ambient: drive.spec.settings.ambient,
        altitude: drive.spec.settings.altitude,
    }
}
