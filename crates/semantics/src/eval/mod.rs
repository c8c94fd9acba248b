//! Values of one state of the spec: the plain one, or a case with its overrides laid over it.

mod compare;
mod cycle;
mod expr;
mod literal;
mod memo;
mod path;
mod tolerance;

use std::cell::RefCell;
use std::collections::BTreeMap;
use std::rc::Rc;

use layshaft_diagnostics::{Code, Diagnostic, FileSpan, Span};
use layshaft_mechanics::drive::StatedSpeed;
use layshaft_mechanics::registry::{self, Field};
use layshaft_syntax::{ItemKind, ValueKind};
use layshaft_units::{Kind, Type};

use crate::defs::{Given, PartDef, SlotName};
use crate::drives::{DriveDef, Solved};
use crate::fields::{Built, FieldRead};
use crate::quantity::{Datum, Quantity};
use crate::sink::Sink;
use crate::solver::Solver;
use crate::unit_memo::Units;
use crate::world::{ItemRef, World};

use memo::{ByItem, Fields, Memo, Once};

pub(crate) use compare::{Compared, compare_words};
pub(crate) use expr::is_literal;
pub(crate) use path::{Station, is_constant, unknown};

/// A place that a case can override.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub(crate) enum Slot {
    Let(ItemRef),
    Field(ItemRef, SlotName),
}

/// What a case lays over the plain spec.
pub(crate) type Overlay<'w> = BTreeMap<Slot, Given<'w>>;

/// Everything that is the same in every state.
#[derive(Clone, Copy)]
pub(crate) struct Shared<'w> {
    pub world: &'w World,
    pub parts: &'w BTreeMap<ItemRef, PartDef<'w>>,
    pub drives: &'w BTreeMap<ItemRef, DriveDef<'w>>,
    pub files: &'w dyn crate::files::Files,
    pub tables: &'w crate::fields::Tables,
    pub solver: &'w Solver,
    pub units: &'w Units,
    pub sink: &'w Sink,
}

/// A stated speed under which results are asked: `at ride.speed = 15 km/h`.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Ask {
    pub drive: ItemRef,
    pub speed: StatedSpeed,
}

/// How an expression is read: where it stands, which kind its place wants, which slot it overrides.
#[derive(Clone, Copy)]
pub(crate) struct Reading<'a> {
    pub at: ItemRef,
    pub wanted: Option<&'a Type>,
    pub own: Option<&'a Slot>,
    pub ask: Option<&'a Ask>,
}

impl Reading<'_> {
    pub fn plain(at: ItemRef) -> Self {
        Self { at, wanted: None, own: None, ask: None }
    }
}

impl<'a> Reading<'a> {
    pub fn wanting(self, wanted: Option<&'a Type>) -> Self {
        Self { wanted, ..self }
    }
}

/// What is being computed: a declaration, or a field as given somewhere.
#[derive(Clone)]
enum Doing {
    Item(ItemRef),
    Field(Rc<Slot>, FileSpan),
}

/// One state of the spec.
pub(crate) struct Eval<'w> {
    pub shared: Shared<'w>,
    pub overlay: Overlay<'w>,
    /// The state without the overlay; none in the plain state itself.
    pub plain: Option<Rc<Eval<'w>>>,
    /// The gear engaged where the spec gives none and all are solved.
    pub gear: Option<Box<str>>,
    /// Whether a drum whose layer the spec leaves open runs on its first layer instead of its top one.
    pub first_layer: bool,
    lets: RefCell<ByItem<Memo<Option<Datum>>>>,
    fields: RefCell<Fields<Option<Rc<FieldRead>>>>,
    built: RefCell<ByItem<Memo<Option<Rc<Built>>>>>,
    solved: RefCell<ByItem<Memo<Rc<Solved>>>>,
    /// What is being computed right now, outermost first: a name met twice is a cycle.
    stack: RefCell<Vec<Doing>>,
    /// The sides compared since this was asked for.
    compared: RefCell<Option<Vec<Compared>>>,
    /// Why the last result asked for is not there, in words.
    remark: RefCell<Option<Remark>>,
}

/// Why a result is not there.
pub(crate) struct Remark {
    pub why: String,
    /// Whether a finding says so already.
    pub reported: bool,
}

impl<'w> Eval<'w> {
    pub fn new(
        shared: Shared<'w>,
        overlay: Overlay<'w>,
        plain: Option<Rc<Eval<'w>>>,
        gear: Option<Box<str>>,
    ) -> Self {
        Self {
            shared,
            overlay,
            plain,
            gear,
            first_layer: false,
            lets: RefCell::default(),
            fields: RefCell::default(),
            built: RefCell::default(),
            solved: RefCell::default(),
            stack: RefCell::default(),
            compared: RefCell::default(),
            remark: RefCell::default(),
        }
    }

    /// Notes why a result is not there; the first reason stands.
    pub fn remark(&self, why: String) {
        self.remark.borrow_mut().get_or_insert(Remark { why, reported: false });
    }

    /// Notes a reason that a finding gives already.
    pub fn remark_reported(&self, why: String) {
        self.remark.borrow_mut().get_or_insert(Remark { why, reported: true });
    }

    /// Takes the reason noted since the last call.
    pub fn take_remark(&self) -> Option<Remark> {
        self.remark.borrow_mut().take()
    }

    pub fn report(&self, found: Diagnostic) {
        self.shared.sink.push(found);
    }

    pub fn place(&self, at: ItemRef, span: Span) -> FileSpan {
        self.shared.world.place(at, span)
    }

    /// Computes once; a value that asks for itself on the way is a cycle, reported with its path.
    fn once<K, T: Clone, M: Once<K, T>>(
        &self,
        memos: impl Fn(&Self) -> &RefCell<M>,
        key: &K,
        doing: Doing,
        unknown: T,
        compute: impl FnOnce() -> T,
    ) -> T {
        match memos(self).borrow().get(key) {
            Some(Memo::Done(value)) => return value.clone(),
            Some(Memo::Busy) => {
                self.report_cycle(&doing);
                return unknown;
            }
            None => {}
        }
        memos(self).borrow_mut().set(key, Memo::Busy);
        self.stack.borrow_mut().push(doing);
        // A chain of ten thousand values is fair text; the stack grows with it.
        let value = stacker::maybe_grow(256 * 1024, 8 * 1024 * 1024, compute);
        self.stack.borrow_mut().pop();
        memos(self).borrow_mut().set(key, Memo::Done(value.clone()));
        value
    }

    /// The value of a `let`.
    pub fn let_value(&self, at: ItemRef) -> Option<Datum> {
        self.let_typed(at)?.known()
    }

    /// The same, of a known kind where the value is not to be had.
    pub(super) fn let_typed(&self, at: ItemRef) -> Option<Datum> {
        let world = self.shared.world;
        let ItemKind::Let { kind, value, .. } = &world.tree(at).kind else { return None };
        let slot = Slot::Let(at);
        self.once(
            |eval| &eval.lets,
            &at,
            Doing::Item(at),
            None,
            || {
                let wanted = kind.as_ref().map(|kind| self.kind_of(at, kind));
                if matches!(wanted, Some(None)) {
                    return None;
                }
                let wanted = wanted.flatten();
                let found = match self.overlay.get(&slot) {
                    Some(given) => self.value_of(given, Some(&slot), wanted),
                    None => self.value_of(&Given { at, entry: no_entry(), value }, None, wanted),
                };
                found.or_else(|| wanted.map(|kind| Datum::Quantity(Quantity::unknown(kind.ty()))))
            },
        )
    }

    /// The kind a `let` is settled to.
    fn kind_of(&self, at: ItemRef, kind: &layshaft_syntax::Name) -> Option<&'static Kind> {
        let found = layshaft_units::kind(&kind.text);
        if found.is_none() {
            let place = self.place(at, kind.span);
            let message = format!("there is no kind of quantity `{}`", kind.text);
            let mut finding = Diagnostic::new(Code::UnknownName, place, message);
            let names = layshaft_units::KINDS.iter().map(|kind| kind.name);
            if let Some(close) = layshaft_units::closest(&kind.text, names) {
                finding = finding.fix(format!("write `{close}`"), place, close);
            } else {
                finding = finding.help("`layshaft kinds` lists them");
            }
            self.report(finding);
        }
        found
    }

    /// A value as a quantity, flag, word or text; tables and the like are read by [`crate::fields`].
    pub fn value_of(
        &self,
        given: &Given<'w>,
        own: Option<&Slot>,
        wanted: Option<&'static Kind>,
    ) -> Option<Datum> {
        let ty = wanted.map(Kind::ty);
        let reading = Reading { at: given.at, wanted: ty.as_ref(), own, ask: None };
        let datum = match &given.value.kind {
            ValueKind::Expr(expr) => self.datum(expr, reading)?,
            ValueKind::Range { low, high } => Datum::Quantity(self.range(low, high, reading)?),
            ValueKind::Missing => return None,
            _ => {
                let place = self.place(given.at, given.value.span);
                self.report(Diagnostic::new(
                    Code::WrongValue,
                    place,
                    "a single value is wanted here, such as `15 km/h`",
                ));
                return None;
            }
        };
        match (datum, wanted) {
            (Datum::Quantity(quantity), Some(kind)) => {
                self.demand(quantity, kind, given.at, given.value.span).map(Datum::Quantity)
            }
            (Datum::Quantity(quantity), None) => {
                Some(Datum::Quantity(Quantity { ty: quantity.ty.named(), ..quantity }))
            }
            (datum, None) => Some(datum),
            (_, Some(kind)) => {
                let place = self.place(given.at, given.value.span);
                let message = format!("{} is wanted here", article(kind.title));
                self.report(Diagnostic::new(Code::KindMismatch, place, message));
                None
            }
        }
    }

    /// A quantity in the kind its place wants.
    pub fn demand(&self, found: Quantity, kind: &'static Kind, at: ItemRef, span: Span) -> Option<Quantity> {
        let place = self.place(at, span);
        match layshaft_units::demand(&found.ty, kind) {
            Ok(None) => {}
            Ok(Some(warning)) => {
                self.report(
                    Diagnostic::new(Code::CountsTurnTwice, place, warning.message())
                        .help(warning.hints().join("; or ")),
                );
            }
            Err(refusal) => {
                self.report(self.mismatch(&found, kind, &refusal, at, span));
                return None;
            }
        }
        Some(Quantity { ty: kind.ty(), ..found })
    }

    /// The field of a part or setting of a drive, as a single value.
    pub fn field(&self, at: ItemRef, name: &SlotName) -> Option<Datum> {
        self.read(at, name)?.datum.clone()
    }

    /// The field of a part or setting of a drive, in the shape its row wants.
    pub fn read(&self, at: ItemRef, name: &SlotName) -> Option<Rc<FieldRead>> {
        let given = self.given(at, name)?;
        let row = self.field_row(at, &name.0)?;
        let slot = Rc::new(Slot::Field(at, name.clone()));
        let place = self.place(given.at, given.entry.key.span);
        self.once(
            |eval| &eval.fields,
            &*slot,
            Doing::Field(Rc::clone(&slot), place),
            None,
            || crate::fields::read(self, row, &given, &slot).map(Rc::new),
        )
    }

    fn field_row(&self, at: ItemRef, name: &str) -> Option<&'static Field> {
        match self.shared.parts.get(&at) {
            Some(part) => part.field(name),
            None => registry::DRIVE_FIELDS.iter().find(|field| field.name == name),
        }
    }

    /// What is given for a field in this state: the case's override, else the part's own entry.
    pub fn given(&self, at: ItemRef, name: &SlotName) -> Option<Given<'w>> {
        if !self.overlay.is_empty()
            && let Some(given) = self.overlay.get(&Slot::Field(at, name.clone()))
        {
            return Some(*given);
        }
        if let Some(part) = self.shared.parts.get(&at) {
            return part.fields.get(name).copied();
        }
        self.shared.drives.get(&at)?.settings.get(name).copied()
    }

    /// Every field given for a part or drive in this state.
    pub fn all_given(&self, at: ItemRef) -> BTreeMap<&SlotName, Given<'w>> {
        let own = self.shared.parts.get(&at).map(|part| &part.fields);
        let own = own.or_else(|| self.shared.drives.get(&at).map(|drive| &drive.settings));
        let mut all: BTreeMap<&SlotName, Given<'w>> =
            own.into_iter().flatten().map(|(name, given)| (name, *given)).collect();
        for (slot, given) in &self.overlay {
            if let Slot::Field(item, name) = slot
                && *item == at
            {
                all.insert(name, *given);
            }
        }
        all
    }

    /// A part's values in this state, and whether they make a model.
    pub fn built(&self, at: ItemRef) -> Option<Rc<Built>> {
        self.once(
            |eval| &eval.built,
            &at,
            Doing::Item(at),
            None,
            || crate::fields::build(self, at).map(Rc::new),
        )
    }

    /// A drive solved in this state.
    pub fn solved(&self, at: ItemRef) -> Rc<Solved> {
        self.once(
            |eval| &eval.solved,
            &at,
            Doing::Item(at),
            Rc::default(),
            || Rc::new(crate::drives::solve(self, at)),
        )
    }
}

/// "a torque", "an angle".
pub(crate) fn article(title: &str) -> String {
    let vowel = title.starts_with(['a', 'e', 'i', 'o', 'u']);
    format!("{} {title}", if vowel { "an" } else { "a" })
}

/// The entry of a value that stands in none: a `let`.
fn no_entry() -> &'static layshaft_syntax::Entry {
    static EMPTY: std::sync::OnceLock<layshaft_syntax::Entry> = std::sync::OnceLock::new();
    EMPTY.get_or_init(|| layshaft_syntax::Entry {
        docs: Vec::new(),
        key: layshaft_syntax::Path { names: Vec::new(), span: Span::default() },
        member: None,
        value: layshaft_syntax::Value { kind: ValueKind::Missing, basis: None, span: Span::default() },
        span: Span::default(),
    })
}
