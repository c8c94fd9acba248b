//! Drives: their chain and settings, and what the solver makes of them.

use std::collections::BTreeMap;
use std::collections::btree_map::Entry as BTreeEntry;
use std::sync::Arc;

use layshaft_diagnostics::{Code, Diagnostic, Span};
use layshaft_mechanics::drive::{self, Direction, DriveSpec, PartSpec, Port, Settings, StatedSpeed};
use layshaft_mechanics::fault::{Fault, FaultKind};
use layshaft_mechanics::model::Motion;
use layshaft_mechanics::registry::{self, ResultShape, Role};
use layshaft_mechanics::solution::Answer;
use layshaft_mechanics::solve::Solution;
use layshaft_mechanics::values::FieldValue;
use layshaft_syntax::{Chain, ChainKind, ItemKind, Name};

use crate::defs::{Given, SlotName, path_text, slot_of, slot_text};
use crate::eval::{Ask, Eval};
use crate::quantity::Datum;
use crate::sink::Sink;
use crate::solver::Handle;
use crate::world::{Declared, ItemRef, World};

/// A drive as declared.
#[derive(Debug)]
pub(crate) struct DriveDef<'w> {
    pub name: &'w Name,
    pub chain: Option<drive::Chain>,
    /// The parts of the chain; [`drive::Chain`] counts them in this order.
    pub members: Vec<ItemRef>,
    /// Where each member stands in the chain, in the drive's own item.
    pub spans: Vec<Span>,
    pub settings: BTreeMap<SlotName, Given<'w>>,
}

/// Every drive of the spec itself.
pub(crate) fn drives<'w>(world: &'w World, sink: &Sink) -> BTreeMap<ItemRef, DriveDef<'w>> {
    let mut found = BTreeMap::new();
    for (at, tree) in world.items(0) {
        let ItemKind::Drive { name, chain, block } = &tree.kind else { continue };
        let mut named = Vec::new();
        let lowered = lower(world, at, chain, &mut named, sink);
        let (members, spans) = named.into_iter().unzip();
        let mut settings = BTreeMap::new();
        for entry in block.iter().flat_map(|block| &block.entries) {
            let slot = slot_of(entry);
            let place = world.place(at, entry.key.span);
            let known = registry::DRIVE_FIELDS.iter().any(|field| field.name == &*slot.0);
            if !known || entry.key.names.len() != 1 || slot.1.is_some() {
                sink.push(unknown_setting(&path_text(&entry.key), place));
                continue;
            }
            match settings.entry(slot) {
                BTreeEntry::Vacant(free) => {
                    free.insert(Given { at, entry, value: &entry.value });
                }
                BTreeEntry::Occupied(taken) => {
                    let message = format!("`{}` is given twice", slot_text(taken.key()));
                    sink.push(Diagnostic::new(Code::DoubledName, place, message));
                }
            }
        }
        found.insert(at, DriveDef { name, chain: lowered, members, spans, settings });
    }
    found
}

pub(crate) fn unknown_setting(written: &str, place: layshaft_diagnostics::FileSpan) -> Diagnostic {
    let found =
        Diagnostic::new(Code::UnknownField, place, format!("`{written}` is not a setting of a drive"));
    let names = || registry::DRIVE_FIELDS.iter().map(|field| field.name);
    match layshaft_units::closest(written, names()) {
        Some(close) => found.fix(format!("write `{close}`"), place, close),
        None => found.help(format!("settings of a drive: {}", names().collect::<Vec<_>>().join(", "))),
    }
}

/// The chain with its parts resolved; none where a name is missing.
fn lower(
    world: &World,
    at: ItemRef,
    chain: &Chain,
    members: &mut Vec<(ItemRef, Span)>,
    sink: &Sink,
) -> Option<drive::Chain> {
    match &chain.kind {
        ChainKind::Broken => None,
        ChainKind::Part { count, path } => {
            let part = member(world, at, path, sink)?;
            if let Some(index) = members.iter().position(|(known, _)| *known == part) {
                let place = world.place(at, path.span);
                let message = format!("`{}` stands in the chain twice", path_text(path));
                let name = path_text(path);
                sink.push(Diagnostic::new(Code::BadChain, place, message).help(format!(
                    "several equal parts side by side are `2 * {name}`; a second one is declared as a variant: `… = {name} with {{ }}`"
                )));
                return Some(drive::Chain::Part { index, count: *count });
            }
            members.push((part, path.span));
            Some(drive::Chain::Part { index: members.len() - 1, count: *count })
        }
        ChainKind::Times { count, inner } => {
            let inner = lower(world, at, inner, members, sink)?;
            Some(times(inner, *count))
        }
        ChainKind::Series(chains) => {
            let lowered: Vec<_> = chains.iter().map(|chain| lower(world, at, chain, members, sink)).collect();
            Some(drive::Chain::Series(lowered.into_iter().collect::<Option<_>>()?))
        }
        ChainKind::Joined(chains) => {
            let lowered: Vec<_> = chains.iter().map(|chain| lower(world, at, chain, members, sink)).collect();
            Some(drive::Chain::Joined(lowered.into_iter().collect::<Option<_>>()?))
        }
    }
}

/// `n * (a -> b)` is the same as `n` equal parts at each place.
fn times(chain: drive::Chain, by: u32) -> drive::Chain {
    match chain {
        drive::Chain::Part { index, count } => drive::Chain::Part { index, count: count.saturating_mul(by) },
        drive::Chain::Series(chains) => {
            drive::Chain::Series(chains.into_iter().map(|chain| times(chain, by)).collect())
        }
        drive::Chain::Joined(chains) => {
            drive::Chain::Joined(chains.into_iter().map(|chain| times(chain, by)).collect())
        }
    }
}

fn member(world: &World, at: ItemRef, path: &layshaft_syntax::Path, sink: &Sink) -> Option<ItemRef> {
    let head = world.head(at.file, &path.names);
    if let Some((Declared::Part, part, used)) = head
        && used == path.names.len()
    {
        return Some(part);
    }
    let place = world.place(at, path.span);
    let written = path_text(path);
    let message = match head {
        Some((Declared::Let | Declared::Drive | Declared::Case, ..)) => format!("`{written}` is not a part"),
        _ => format!("there is no part `{written}`"),
    };
    let found = Diagnostic::new(Code::UnknownName, place, message);
    let names = world.scopes[at.file as usize].names.iter();
    let parts = names.filter(|(_, (declared, _))| *declared == Declared::Part);
    sink.push(match layshaft_units::closest(&written, parts.map(|(name, _)| &**name)) {
        Some(close) => found.fix(format!("write `{close}`"), place, close),
        None => found.help("declare it as `source`, `transmission` or `load`"),
    });
    None
}

/// A drive in one state.
#[derive(Debug, Default)]
pub(crate) struct Solved {
    pub drive: Option<Handle>,
    pub solution: Option<Arc<Solution>>,
    pub faults: Vec<Fault>,
    /// Item of each part of the spec, supplies included.
    pub items: Vec<ItemRef>,
}

/// Lowers a drive in one state and solves it.
pub(crate) fn solve(eval: &Eval<'_>, at: ItemRef) -> Solved {
    if eval.shared.files.interrupted() {
        return Solved::default();
    }
    let Some(def) = eval.shared.drives.get(&at) else { return Solved::default() };
    let Some((spec, items)) = lowered(eval, at, def) else { return Solved::default() };
    let (drive, solution) = eval.shared.solver.solve(spec);
    let (solution, faults) = match solution {
        Ok(solution) => (Some(solution), Vec::new()),
        Err(faults) => (None, faults),
    };
    let solved = Solved { drive: Some(drive), solution, faults, items };
    solved.report(eval, at, &solved.faults);
    if let Some(solution) = &solved.solution {
        solved.report(eval, at, &solution.faults());
    }
    solved
}

fn lowered(eval: &Eval<'_>, at: ItemRef, def: &DriveDef<'_>) -> Option<(DriveSpec, Vec<ItemRef>)> {
    let mut items = def.members.clone();
    let mut parts = Vec::new();
    let mut sound = true;
    let mut index = 0;
    while index < items.len() {
        match part_spec(eval, items[index], &mut items) {
            Some(part) => parts.push(part),
            None => sound = false,
        }
        index += 1;
    }
    let settings = settings(eval, at, &items);
    if !sound {
        return None;
    }
    Some((DriveSpec { parts, chain: def.chain.clone()?, settings: settings? }, items))
}

/// A part with its links turned into indices; supplies are taken up behind the members.
fn part_spec(eval: &Eval<'_>, item: ItemRef, items: &mut Vec<ItemRef>) -> Option<PartSpec> {
    let part = eval.shared.parts.get(&item)?;
    let built = eval.built(item)?;
    if !built.sound {
        return None;
    }
    let mut values = built.values.clone();
    for (field, link) in &built.links {
        let index = items.iter().position(|known| known == link).unwrap_or_else(|| {
            items.push(*link);
            items.len() - 1
        });
        values.set(field, FieldValue::Part(index));
    }
    Some(PartSpec { name: part.name.text.to_string(), row: part.row?, values, on: built.on })
}

fn settings(eval: &Eval<'_>, at: ItemRef, items: &[ItemRef]) -> Option<Settings> {
    let mut settings = Settings::default();
    let mut sound = true;
    for slot in eval.all_given(at).keys() {
        if &*slot.0 == "gear" {
            match eval.field(at, slot) {
                Some(datum) => settings.gear = gear_name(&datum),
                None => sound = false,
            }
            continue;
        }
        let Some(read) = eval.read(at, slot) else {
            sound = false;
            continue;
        };
        match (&*slot.0, read.value.clone()) {
            ("direction", FieldValue::Word("reverse")) => settings.direction = Direction::Reverse,
            ("set_speed", FieldValue::Si(speed)) => {
                settings.set_speed = Some(set_speed(eval, speed, read.datum.as_ref(), items));
            }
            ("droop", FieldValue::Si(droop)) => settings.droop = droop,
            ("run_up_to", FieldValue::Si(share)) => settings.run_up_to = share,
            ("duty", FieldValue::Duty(duty)) => settings.duty = Some(duty),
            ("application_factor", FieldValue::Si(factor)) => settings.application_factor = factor,
            ("ambient", FieldValue::Si(kelvin)) => settings.ambient = Some(kelvin),
            ("altitude", FieldValue::Si(metres)) => settings.altitude = Some(metres),
            _ => {}
        }
    }
    if settings.gear.is_none() {
        settings.gear = eval.gear.as_ref().map(ToString::to_string);
    }
    sound.then_some(settings)
}

fn gear_name(datum: &Datum) -> Option<String> {
    match datum {
        Datum::Word(word) | Datum::Text(word) => Some(word.to_string()),
        Datum::Quantity(quantity) => Some(crate::say::plain(quantity.si)),
        Datum::Flag(_) => None,
    }
}

/// A rotational speed is set at the (first) source, a linear speed at the load.
fn set_speed(eval: &Eval<'_>, speed: f64, datum: Option<&Datum>, items: &[ItemRef]) -> StatedSpeed {
    let rotary = match datum {
        Some(Datum::Quantity(found)) => {
            layshaft_units::kind("speed").is_none_or(|kind| found.ty != kind.ty())
        }
        _ => true,
    };
    let is_source =
        |item: &ItemRef| eval.shared.parts.get(item).is_some_and(|part| part.role == Role::Source);
    let part = if rotary { items.iter().position(is_source) } else { None };
    StatedSpeed { part, port: None, speed }
}

impl Solved {
    /// Reports faults at the parts they are about, else at the drive.
    pub fn report(&self, eval: &Eval<'_>, drive: ItemRef, faults: &[Fault]) {
        for fault in faults {
            let spans = eval.shared.drives.get(&drive).map(|def| &def.spans);
            if let (FaultKind::Chain { how }, Some(part)) = (&fault.kind, fault.part)
                && let Some(span) = spans.and_then(|spans| spans.get(part))
            {
                let place = eval.place(drive, *span);
                eval.remark_reported(crate::say::note(how));
                eval.report(Diagnostic::new(Code::BadChain, place, crate::say::note(how)));
                continue;
            }
            let owner = fault.part.and_then(|part| self.items.get(part)).copied().unwrap_or(drive);
            if let Some(found) = crate::faults::cook(eval, owner, fault) {
                eval.remark_reported(found.message.clone());
                eval.report(found);
            }
        }
    }

    /// The answer to a question about this drive; `None` where the spec stands in the way (which has been reported).
    pub fn answer(
        &self,
        eval: &Eval<'_>,
        station: &crate::eval::Station,
        ask: Option<&Ask>,
    ) -> Option<Answer> {
        if eval.shared.files.interrupted() {
            return None;
        }
        let part = match station.part {
            Some(part) => Some(self.items.iter().position(|item| *item == part)?),
            None => None,
        };
        if let Some(ask) = ask {
            let drive = self.drive.as_ref()?;
            return match eval.shared.solver.solve_at(drive, ask.speed) {
                Ok(solution) => Some(solution.answer(part, station.port, &station.result)),
                Err(faults) => self.first_fault(eval, &faults),
            };
        }
        match &self.solution {
            Some(solution) => Some(solution.answer(part, station.port, &station.result)),
            None => self.first_fault(eval, &self.faults),
        }
    }

    /// A result without an upper end, such as the speed of a drive that runs away: above every limit.
    pub fn unbounded(&self, station: &crate::eval::Station) -> Option<Datum> {
        let part = match station.part {
            Some(part) => Some(self.items.iter().position(|item| *item == part)?),
            None => None,
        };
        let kind = if self.is_linear(part, station.port)? { "speed" } else { "rotational_speed" };
        crate::fields::quantity(f64::INFINITY, kind)
    }

    /// The kind of a result whose value is not to be had; none for flags and words.
    pub fn unknown(&self, station: &crate::eval::Station) -> Option<Datum> {
        let motion = || {
            let part = match station.part {
                Some(part) => Some(self.items.iter().position(|item| *item == part)?),
                None => None,
            };
            self.solution.as_ref()?.motion(part, station.port)
        };
        match station.shape {
            ResultShape::Quantity(kind) => crate::eval::unknown(kind),
            ResultShape::Speed => crate::eval::unknown(motion()?.speed_kind()),
            ResultShape::Effort => crate::eval::unknown(motion()?.effort_kind()),
            _ => None,
        }
    }

    /// Whether a station runs straight.
    pub fn is_linear(&self, part: Option<usize>, port: Option<Port>) -> Option<bool> {
        let motion = self.solution.as_ref()?.motion(part, port)?;
        Some(motion == Motion::Linear)
    }

    /// A drive that cannot be solved answers every question with the reason.
    fn first_fault(&self, eval: &Eval<'_>, faults: &[Fault]) -> Option<Answer> {
        let fault = faults.first()?;
        let owner = fault.part.and_then(|part| self.items.get(part)).copied();
        let found = crate::faults::cook(eval, owner?, fault)?;
        eval.remark_reported(found.message);
        None
    }
}
