//! A value that depends on itself, told with its path.

use layshaft_diagnostics::{Code, Diagnostic, FileSpan, Span};

use super::{Doing, Eval, Slot};
use crate::world::ItemRef;

impl Eval<'_> {
    /// The name of what is computed, and its place.
    fn named(&self, doing: &Doing) -> (Box<str>, FileSpan) {
        let name = |at: ItemRef| self.shared.world.name(at);
        let text = |at| name(at).map_or("", |name| &name.text);
        match doing {
            Doing::Item(at) => {
                let span = name(*at).map_or_else(Span::default, |name| name.span);
                (text(*at).into(), self.place(*at, span))
            }
            Doing::Field(slot, place) => {
                let label = match &**slot {
                    Slot::Let(at) => text(*at).to_owned(),
                    Slot::Field(at, field) => format!("{}.{}", text(*at), crate::defs::slot_text(field)),
                };
                (label.into(), *place)
            }
        }
    }

    /// Reports the ring that closes at a name met again; the same ring once, wherever it was entered.
    pub(super) fn report_cycle(&self, doing: &Doing) {
        let (name, place) = self.named(doing);
        let stack: Vec<_> = self.stack.borrow().iter().map(|doing| self.named(doing)).collect();
        let from = stack.iter().position(|(_, at)| *at == place).unwrap_or(0);
        let mut ring: Vec<&(Box<str>, FileSpan)> = stack[from..].iter().collect();
        // The same ring is told once, from its first place in the text, wherever it was entered.
        let first = (0..ring.len()).min_by_key(|&index| ring[index].1).unwrap_or(0);
        ring.rotate_left(first);
        let Some((start, place)) = ring.first().map(|(name, place)| (name.clone(), *place)) else { return };
        let mut path: Vec<&str> = ring.iter().map(|(name, _)| &**name).take(12).collect();
        if ring.len() > path.len() {
            path.push("…");
        }
        path.push(&start);
        let mut found = Diagnostic::new(
            Code::Cycle,
            place,
            format!("`{start}` depends on itself: {}", path.join(" -> ")),
        );
        for (other, at) in ring.iter().skip(1).take(8) {
            found = found.related(*at, format!("`{other}` takes part"));
        }
        debug_assert!(!name.is_empty());
        self.report(found.help(
            "give one of them a value of its own; a value to be found so that criteria hold is a matter for `determine`, which a later version of the language will have",
        ));
    }
}
