//! Parts with their fields gathered: kind, own entries, and what a variant inherits by reference.

use std::collections::BTreeMap;

use layshaft_diagnostics::{Code, Diagnostic, Span};
use layshaft_mechanics::registry::{self, Field, KindRow, Need, Role, Shape};
use layshaft_syntax::{Block, Entry, ItemKind, Name, PartBase, RoleWord, Value, ValueKind};

use crate::sink::Sink;
use crate::world::{Declared, ItemRef, World};

/// A field as given somewhere.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Given<'w> {
    /// The item the entry stands in: the part itself, the base of a variant, or a case.
    pub at: ItemRef,
    /// The entry.
    pub entry: &'w Entry,
    /// Its value (one of several where a case says `each`).
    pub value: &'w Value,
}

/// The name of a slot of a part: the field, and the member for named gears.
pub(crate) type SlotName = (Box<str>, Option<Box<str>>);

/// A part with its fields.
#[derive(Debug)]
pub(crate) struct PartDef<'w> {
    pub at: ItemRef,
    pub name: &'w Name,
    pub role: Role,
    pub row: Option<&'static KindRow>,
    pub fields: BTreeMap<SlotName, Given<'w>>,
    /// Fields that could not be read: their absence is no second mistake.
    pub broken: bool,
}

impl PartDef<'_> {
    /// The row of a field.
    pub fn field(&self, name: &str) -> Option<&'static Field> {
        field_of(self.row?, self.role, name)
    }
}

/// A field of a kind, the common ones of its role included.
pub(crate) fn field_of(row: &'static KindRow, role: Role, name: &str) -> Option<&'static Field> {
    row.fields.iter().chain(registry::common_fields(role)).find(|field| field.name == name)
}

/// Every part of every file.
pub(crate) fn parts<'w>(world: &'w World, sink: &Sink) -> BTreeMap<ItemRef, PartDef<'w>> {
    let mut builder = Builder { world, sink, done: BTreeMap::new(), busy: Vec::new() };
    for file in 0..world.files.len() as u32 {
        for (at, tree) in world.items(file) {
            if matches!(tree.kind, ItemKind::Part { .. }) {
                builder.define(at);
            }
        }
    }
    builder.done
}

pub(crate) fn role_of(word: RoleWord) -> Role {
    match word {
        RoleWord::Supply => Role::Supply,
        RoleWord::Source => Role::Source,
        RoleWord::Transmission => Role::Transmission,
        RoleWord::Load => Role::Load,
    }
}

pub(crate) fn role_word(role: Role) -> &'static str {
    match role {
        Role::Supply => "supply",
        Role::Source => "source",
        Role::Transmission => "transmission",
        Role::Load => "load",
    }
}

struct Builder<'w, 's> {
    world: &'w World,
    sink: &'s Sink,
    done: BTreeMap<ItemRef, PartDef<'w>>,
    busy: Vec<ItemRef>,
}

impl<'w> Builder<'w, '_> {
    fn define(&mut self, at: ItemRef) {
        if self.done.contains_key(&at) {
            return;
        }
        let ItemKind::Part { role, name, base, block, .. } = &self.world.tree(at).kind else { return };
        let role = role_of(*role);
        let broken = !self.world.tree(at).problems.is_empty();
        let mut def = PartDef { at, name, role, row: None, fields: BTreeMap::new(), broken };
        match base {
            PartBase::Kind(kind) => def.row = self.row(at, role, kind),
            PartBase::Variant(path) => self.inherit(&mut def, path),
        }
        self.take_block(&mut def, block, matches!(base, PartBase::Variant(_)));
        self.done.insert(at, def);
    }

    fn row(&self, at: ItemRef, role: Role, kind: &Name) -> Option<&'static KindRow> {
        let found = registry::row(role, &kind.text);
        if found.is_none() && !kind.text.is_empty() {
            self.sink.push(unknown_kind(self.world, at, role, kind));
        }
        found
    }

    fn inherit(&mut self, def: &mut PartDef<'w>, path: &layshaft_syntax::Path) {
        let place = self.world.place(def.at, path.span);
        let head = self.world.head(def.at.file, &path.names);
        let Some((Declared::Part, base, used)) = head.filter(|(.., used)| *used == path.names.len()) else {
            let message = format!("there is no part `{}` to make a variant of", path_text(path));
            let mut found = Diagnostic::new(Code::UnknownName, place, message);
            let names = self.world.scopes[def.at.file as usize].names.iter();
            let parts = names.filter(|(_, (declared, _))| *declared == Declared::Part);
            if let Some(close) = layshaft_units::closest(&path_text(path), parts.map(|(name, _)| &**name)) {
                found = found.fix(format!("write `{close}`"), place, close);
            }
            self.sink.push(found);
            def.broken = true;
            return;
        };
        debug_assert!(used > 0);
        self.busy.push(def.at);
        if self.busy.contains(&base) {
            let names: Vec<_> =
                self.busy.iter().filter_map(|at| self.world.name(*at)).map(|name| &*name.text).collect();
            let message = format!("`{}` is a variant of itself: {}", def.name.text, names.join(" -> "));
            self.sink.push(Diagnostic::new(Code::Cycle, place, message));
            def.broken = true;
            self.busy.pop();
            return;
        }
        self.define(base);
        self.busy.pop();
        let Some(base) = self.done.get(&base) else {
            def.broken = true;
            return;
        };
        if base.role != def.role {
            let message =
                format!("`{}` is a {}, and a variant of it too", path_text(path), role_word(base.role));
            self.sink.push(
                Diagnostic::new(Code::WrongValue, place, message)
                    .help(format!("begin the line with `{}`", role_word(base.role))),
            );
        }
        def.role = base.role;
        def.row = base.row;
        def.broken |= base.broken;
        def.fields.clone_from(&base.fields);
    }

    fn take_block(&self, def: &mut PartDef<'w>, block: &'w Block, variant: bool) {
        let mut own: BTreeMap<SlotName, Span> = BTreeMap::new();
        for entry in &block.entries {
            let Some(slot) = self.slot(def, entry) else {
                def.broken = true;
                continue;
            };
            if let Some(first) = own.get(&slot) {
                let message = format!("`{}` is given twice", slot_text(&slot));
                let place = self.world.place(def.at, entry.key.span);
                self.sink.push(
                    Diagnostic::new(Code::DoubledName, place, message)
                        .related(self.world.place(def.at, *first), "first given here"),
                );
                continue;
            }
            own.insert(slot.clone(), entry.key.span);
            match entry.value.kind {
                ValueKind::Absent if variant => {
                    self.remove(def, &slot, entry);
                }
                ValueKind::Absent => {
                    let place = self.world.place(def.at, entry.value.span);
                    let message = "`absent` takes a field of the base away; there is no base here";
                    self.sink
                        .push(Diagnostic::new(Code::WrongValue, place, message).help("leave the line out"));
                }
                ValueKind::Missing => def.broken = true,
                _ => {
                    def.fields.insert(slot, Given { at: def.at, entry, value: &entry.value });
                }
            }
        }
    }

    fn remove(&self, def: &mut PartDef<'w>, slot: &SlotName, entry: &Entry) {
        if def.fields.remove(slot).is_none() {
            let place = self.world.place(def.at, entry.span);
            let message = format!("the base does not give `{}`, so nothing is taken away", slot_text(slot));
            self.sink.push(Diagnostic::new(Code::WrongValue, place, message).help("leave the line out"));
        }
    }

    /// The slot an entry fills, if the kind has such a field.
    fn slot(&self, def: &PartDef<'w>, entry: &Entry) -> Option<SlotName> {
        let slot = slot_of(entry);
        let row = def.row?;
        let known = field_of(row, def.role, &slot.0);
        let fits = known.is_some_and(|field| fits_member(row, field, slot.1.is_some()));
        if fits && entry.key.names.len() == 1 {
            return Some(slot);
        }
        self.sink.push(unknown_field(self.world, def.at, row, def.role, entry));
        None
    }
}

/// Whether a field stands with (or without) a gear's name behind it: a gear always does, an efficiency may.
pub(crate) fn fits_member(row: &KindRow, field: &Field, member: bool) -> bool {
    let loss = field.name == "efficiency" || field.name == "efficiency_backward";
    let geared = || row.fields.iter().any(|field| field.shape == Shape::Gears);
    member == (field.shape == Shape::Gears) || (member && loss && geared())
}

/// The finding for a kind that does not exist.
fn unknown_kind(world: &World, at: ItemRef, role: Role, kind: &Name) -> Diagnostic {
    let place = world.place(at, kind.span);
    let word = role_word(role);
    let mut found =
        Diagnostic::new(Code::UnknownName, place, format!("there is no {word} of the kind `{}`", kind.text));
    let of_role = || registry::rows().iter().filter(|row| row.role == role).map(|row| row.name);
    if let Some(other) = registry::rows().iter().find(|row| row.name == &*kind.text) {
        found = found.help(format!("`{}` is a kind of {}", kind.text, role_word(other.role)));
    } else if let Some(close) = layshaft_units::closest(&kind.text, of_role()) {
        found = found.fix(format!("write `{close}`"), place, close);
    } else {
        let all: Vec<_> = of_role().collect();
        found = found.help(format!("kinds of {word}: {}", all.join(", ")));
    }
    found
}

/// The finding for a field that the kind does not have.
pub(crate) fn unknown_field(
    world: &World,
    at: ItemRef,
    row: &'static KindRow,
    role: Role,
    entry: &Entry,
) -> Diagnostic {
    let written = path_text(&entry.key);
    let place = world.place(at, entry.key.span);
    let message = format!("`{written}` is not a field of a `{}`", row.name);
    let mut found = Diagnostic::new(Code::UnknownField, place, message);
    let fields = || row.fields.iter().chain(registry::common_fields(role));
    if let Some(close) = layshaft_units::closest(&written, fields().map(|field| field.name)) {
        return found.fix(format!("write `{close}`"), place, close);
    }
    if matches!(&*written, "ratio" | "i" | "gear_ratio") {
        found = found.note("a bare ratio can be read either way up");
        if fields().any(|field| field.name == "reduction") {
            return found.help(
                "write `reduction = …` (output slower), `increase = …` (output faster) or `teeth = a drives b`",
            );
        }
    }
    let names: Vec<_> = fields().map(|field| field.name).collect();
    found.help(format!("its fields: {}", names.join(", ")))
}

pub(crate) fn slot_of(entry: &Entry) -> SlotName {
    let field = entry.key.names.last().map_or("", |name| &name.text);
    (field.into(), entry.member.as_ref().map(|name| name.text.clone()))
}

pub(crate) fn slot_text(slot: &SlotName) -> String {
    match &slot.1 {
        Some(member) => format!("{} {member}", slot.0),
        None => slot.0.to_string(),
    }
}

pub(crate) fn path_text(path: &layshaft_syntax::Path) -> String {
    let names: Vec<_> = path.names.iter().map(|name| &*name.text).collect();
    names.join(".")
}

/// Whether a field must stand in the text.
pub(crate) fn required(field: &Field) -> bool {
    field.need == Need::Required
}
