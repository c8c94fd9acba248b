//! Cases: what each lays over the plain spec, one state for every combination of `each`.

use std::collections::BTreeMap;
use std::rc::Rc;

use layshaft_diagnostics::{Code, Diagnostic, FileSpan, Span};
use layshaft_mechanics::registry;
use layshaft_syntax::{Block, CaseRef, Entry, ItemKind, Name, Value, ValueKind};

use crate::defs::{Given, fits_member, path_text, slot_of, unknown_field};
use crate::eval::{Eval, Overlay, Reading, Shared, Slot};
use crate::quantity::Datum;
use crate::world::{Declared, ItemRef};

/// How many states one spec may have.
pub(crate) const MOST_STATES: usize = 1_000;

/// One combination of a case.
#[derive(Clone, Default)]
pub(crate) struct Combination<'w> {
    pub overlay: Overlay<'w>,
    /// The members of `each`: what stands between the brackets of the label.
    pub members: Vec<Given<'w>>,
}

/// A state of the spec: plain, or one combination of a case, in one gear, on one layer of rope.
pub(crate) struct State<'w> {
    /// Index in the analysis' list of cases.
    pub case: usize,
    pub name: Box<str>,
    pub label: String,
    pub place: FileSpan,
    pub members: Vec<Given<'w>>,
    /// The gear, where the spec engages none.
    pub gear: Option<Box<str>>,
    pub eval: Rc<Eval<'w>>,
}

/// Every state of the spec, plain first.
pub(crate) fn states<'w>(shared: Shared<'w>) -> Vec<State<'w>> {
    let plain = Rc::new(Eval::new(shared, Overlay::new(), None, None));
    let whole = FileSpan { file: layshaft_diagnostics::FileId(0), span: Span::default() };
    let mut states = Vec::new();
    let mut builder = Builder { shared, plain: Rc::clone(&plain), busy: Vec::new(), count: 1 };
    let mut case = builder.open(&mut states, 0, "plain", whole, Combination::default());
    for (at, tree) in shared.world.items(0) {
        let ItemKind::Case { name, .. } = &tree.kind else { continue };
        if shared.world.find(0, &name.text) != Some((Declared::Case, at)) {
            continue;
        }
        for combination in builder.combinations(at) {
            let place = shared.world.place(at, name.span);
            case = builder.open(&mut states, case, &name.text, place, combination);
        }
    }
    states
}

/// The states of `plain with { … }` and the like, which only one criterion asks for.
pub(crate) fn states_with<'w>(
    shared: Shared<'w>,
    base: &State<'w>,
    at: ItemRef,
    block: &'w Block,
    first_case: usize,
) -> Vec<State<'w>> {
    let plain = base.eval.plain.clone().unwrap_or_else(|| Rc::clone(&base.eval));
    let mut builder = Builder { shared, plain, busy: Vec::new(), count: 0 };
    let start = Combination { overlay: base.eval.overlay.clone(), members: Vec::new() };
    let mut states = Vec::new();
    let words: Vec<_> = block.entries.iter().map(|entry| shared.world.text(at, entry.span)).collect();
    let name = format!("{} with {{ {} }}", base.label, words.join("; "));
    let mut case = first_case;
    for combination in builder.over(vec![start], at, block) {
        let place = shared.world.place(at, block.span);
        case = builder.open(&mut states, case, &name, place, combination);
    }
    states
}

struct Builder<'w> {
    shared: Shared<'w>,
    plain: Rc<Eval<'w>>,
    busy: Vec<ItemRef>,
    count: usize,
}

impl<'w> Builder<'w> {
    /// Adds the states of one combination: one, or one for each gear where none is engaged; and the same again on the
    /// first layer of a drum that leaves its layer open, as a case of its own. Gives the next free index of a case.
    fn open(
        &self,
        states: &mut Vec<State<'w>>,
        case: usize,
        name: &str,
        place: FileSpan,
        of: Combination<'w>,
    ) -> usize {
        let world = self.shared.world;
        let words: Vec<_> =
            of.members.iter().map(|given| world.text(given.at, given.value.span).to_owned()).collect();
        let label = if words.is_empty() { name.to_owned() } else { format!("{name}[{}]", words.join(", ")) };
        let plain = (case != 0).then(|| Rc::clone(&self.plain));
        let first = match &plain {
            None => Rc::clone(&self.plain),
            Some(_) => Rc::new(Eval::new(self.shared, of.overlay.clone(), plain.clone(), None)),
        };
        let blank = State {
            case,
            name: name.into(),
            label,
            place,
            members: of.members.clone(),
            gear: None,
            eval: Rc::clone(&first),
        };
        self.in_gears(states, &blank, plain);
        if states.len() >= MOST_STATES || !crate::gears::open_layers(&first) {
            return case + 1;
        }
        let plain = Some(Rc::clone(&self.plain));
        let mut eval = Eval::new(self.shared, of.overlay, plain.clone(), None);
        eval.first_layer = true;
        let label = format!("{}, layer 1", blank.label);
        let blank = State { case: case + 1, label, eval: Rc::new(eval), ..blank };
        self.in_gears(states, &blank, plain);
        case + 2
    }

    /// Adds a state, in each gear where none is engaged.
    fn in_gears(&self, states: &mut Vec<State<'w>>, blank: &State<'w>, plain: Option<Rc<Eval<'w>>>) {
        let state = |gear: Option<Box<str>>, eval| State {
            case: blank.case,
            name: blank.name.clone(),
            label: blank.label.clone(),
            place: blank.place,
            members: blank.members.clone(),
            gear,
            eval,
        };
        let gears = crate::gears::open_gears(&blank.eval);
        if gears.is_empty() {
            states.push(state(None, Rc::clone(&blank.eval)));
        }
        for gear in gears {
            let overlay = blank.eval.overlay.clone();
            let mut eval = Eval::new(self.shared, overlay, plain.clone(), Some(gear.clone()));
            eval.first_layer = blank.eval.first_layer;
            states.push(state(Some(gear), Rc::new(eval)));
        }
    }

    fn report(&self, found: Diagnostic) {
        self.shared.sink.push(found);
    }

    /// The combinations of a declared case.
    fn combinations(&mut self, at: ItemRef) -> Vec<Combination<'w>> {
        let world = self.shared.world;
        let ItemKind::Case { name, bases, block } = &world.tree(at).kind else { return Vec::new() };
        if self.busy.contains(&at) {
            let names: Vec<_> =
                self.busy.iter().filter_map(|at| world.name(*at)).map(|name| &*name.text).collect();
            let message = format!("`{}` is composed of itself: {} -> {0}", name.text, names.join(" -> "));
            self.report(Diagnostic::new(Code::Cycle, world.place(at, name.span), message));
            return Vec::new();
        }
        self.busy.push(at);
        let mut combinations = vec![Combination::default()];
        for base in bases {
            let Some(base) = self.base(at, base) else { continue };
            let theirs = self.combinations(base);
            combinations = self.product(at, name, combinations, &theirs);
        }
        if let Some(block) = block {
            if block.entries.is_empty() && bases.is_empty() && world.tree(at).problems.is_empty() {
                let message = format!("the case `{}` changes nothing", name.text);
                self.report(
                    Diagnostic::new(Code::BadCase, world.place(at, name.span), message)
                        .help("the spec without case is always judged, under the name `plain`"),
                );
            }
            combinations = self.over(combinations, at, block);
        }
        self.busy.pop();
        combinations
    }

    fn base(&self, at: ItemRef, name: &Name) -> Option<ItemRef> {
        if &*name.text == "plain" {
            return None;
        }
        let world = self.shared.world;
        if let Some((Declared::Case, base)) = world.find(at.file, &name.text) {
            return Some(base);
        }
        self.report(unknown_case(self.shared, at, name));
        None
    }

    fn product(
        &mut self,
        at: ItemRef,
        name: &Name,
        ours: Vec<Combination<'w>>,
        theirs: &[Combination<'w>],
    ) -> Vec<Combination<'w>> {
        if !self.room(at, name.span, ours.len().saturating_mul(theirs.len())) {
            return ours;
        }
        let mut all = Vec::new();
        for a in &ours {
            for b in theirs {
                let mut both = a.clone();
                both.overlay.extend(b.overlay.iter().map(|(slot, given)| (slot.clone(), *given)));
                both.members.extend(&b.members);
                all.push(both);
            }
        }
        all
    }

    /// Whether so many combinations may be made.
    fn room(&mut self, at: ItemRef, span: Span, combinations: usize) -> bool {
        if combinations + self.count <= MOST_STATES {
            return true;
        }
        let message = format!("this makes {combinations} cases, and a spec may have {MOST_STATES}");
        let place = self.shared.world.place(at, span);
        self.report(Diagnostic::new(Code::TooLarge, place, message).help("vary fewer fields at once"));
        false
    }

    /// Lays the entries of a block over combinations.
    fn over(
        &mut self,
        mut combinations: Vec<Combination<'w>>,
        at: ItemRef,
        block: &'w Block,
    ) -> Vec<Combination<'w>> {
        let mut own: BTreeMap<Slot, Span> = BTreeMap::new();
        for entry in &block.entries {
            let Some(slot) = self.slot(at, entry) else { continue };
            if own.insert(slot.clone(), entry.key.span).is_some() {
                let message = format!("`{}` is changed twice", path_text(&entry.key));
                let place = self.shared.world.place(at, entry.key.span);
                self.report(Diagnostic::new(Code::DoubledName, place, message));
                continue;
            }
            let values: &'w [Value] = match &entry.value.kind {
                ValueKind::Each(values) => values,
                ValueKind::Missing => continue,
                _ => std::slice::from_ref(&entry.value),
            };
            if !self.room(at, entry.span, combinations.len().saturating_mul(values.len())) {
                continue;
            }
            let several = matches!(entry.value.kind, ValueKind::Each(_));
            let mut all = Vec::new();
            for combination in &combinations {
                for value in values {
                    let mut next = combination.clone();
                    let given = Given { at, entry, value };
                    next.overlay.insert(slot.clone(), given);
                    if several {
                        next.members.push(given);
                    }
                    all.push(next);
                }
            }
            combinations = all;
        }
        self.count = self.count.max(combinations.len());
        combinations
    }

    /// What an entry of a case changes.
    fn slot(&self, at: ItemRef, entry: &Entry) -> Option<Slot> {
        let world = self.shared.world;
        let names = &entry.key.names;
        let place = world.place(at, entry.key.span);
        let written = path_text(&entry.key);
        let Some((declared, item, used)) = world.head(at.file, names) else {
            let known = &world.scopes[at.file as usize].names;
            let mut found = Diagnostic::new(
                Code::UnknownName,
                place,
                format!("nothing here is called `{}`", names.first().map_or("", |name| &name.text)),
            );
            if let Some(first) = names.first()
                && let Some(close) = layshaft_units::closest(&first.text, known.keys().map(|name| &**name))
            {
                let place = world.place(at, first.span);
                found = found.fix(format!("write `{close}`"), place, close);
            }
            self.report(found);
            return None;
        };
        let slot = slot_of(entry);
        match (declared, names.len() - used) {
            (Declared::Let, 0) => Some(Slot::Let(item)),
            (Declared::Part, 1) => {
                let part = self.shared.parts.get(&item)?;
                let row = part.row?;
                let fits = |field| fits_member(row, field, slot.1.is_some());
                if !part.field(&slot.0).is_some_and(fits) {
                    self.report(unknown_field(world, at, row, part.role, entry));
                    return None;
                }
                Some(Slot::Field(item, slot))
            }
            (Declared::Drive, 1) => {
                if !registry::DRIVE_FIELDS.iter().any(|field| field.name == &*slot.0) {
                    self.report(crate::drives::unknown_setting(&written, place));
                    return None;
                }
                Some(Slot::Field(item, slot))
            }
            _ => {
                let message = format!("`{written}` cannot be changed by a case");
                self.report(Diagnostic::new(Code::BadCase, place, message).help(
                    "a case changes values (`rated_load`), fields of parts (`hook.mass`) and settings of drives (`lift.direction`)",
                ));
                None
            }
        }
    }
}

pub(crate) fn unknown_case(shared: Shared<'_>, at: ItemRef, name: &Name) -> Diagnostic {
    let world = shared.world;
    let place = world.place(at, name.span);
    let found = Diagnostic::new(Code::UnknownName, place, format!("there is no case `{}`", name.text));
    let names = world.scopes[at.file as usize].names.iter();
    let cases = names.filter(|(_, (declared, _))| *declared == Declared::Case).map(|(name, _)| &**name);
    match layshaft_units::closest(&name.text, cases.chain(["plain"])) {
        Some(close) => found.fix(format!("write `{close}`"), place, close),
        None => found.help("`plain` is the spec without case"),
    }
}

/// Whether a state is one of those a reference names; `ramp[1]` names the combinations with that member.
pub(crate) fn is_named(state: &State<'_>, at: ItemRef, reference: &CaseRef) -> bool {
    if state.name != reference.name.text {
        return false;
    }
    let mut free: Vec<&Given<'_>> = state.members.iter().collect();
    reference.members.iter().all(|wanted| {
        let same = free.iter().position(|given| same_value(state, given, at, wanted));
        same.map(|index| free.remove(index)).is_some()
    })
}

fn same_value(state: &State<'_>, given: &Given<'_>, at: ItemRef, wanted: &Value) -> bool {
    let world = state.eval.shared.world;
    let words = |text: &str| text.split_whitespace().collect::<String>();
    if words(world.text(given.at, given.value.span)) == words(world.text(at, wanted.span)) {
        return true;
    }
    let (ValueKind::Expr(a), ValueKind::Expr(b)) = (&given.value.kind, &wanted.kind) else { return false };
    if !(crate::eval::is_literal(a) && crate::eval::is_literal(b)) {
        return false;
    }
    let a = state.eval.datum(a, Reading::plain(given.at));
    let b = state.eval.datum(b, Reading::plain(at));
    matches!((a, b), (Some(Datum::Quantity(a)), Some(Datum::Quantity(b))) if a.si == b.si && a.ty == b.ty)
}
