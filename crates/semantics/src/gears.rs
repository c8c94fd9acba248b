//! Gears nobody engaged: all are solved and shown, none is chosen silently.

use layshaft_diagnostics::Span;
use layshaft_mechanics::registry::Shape;

use crate::eval::Eval;
use crate::world::ItemRef;

/// The gears to solve where a drive has a gearbox and the spec engages none.
pub(crate) fn open_gears(eval: &Eval<'_>) -> Vec<Box<str>> {
    let mut names: Vec<(ItemRef, Span, Box<str>)> = Vec::new();
    for (at, def) in eval.shared.drives {
        if eval.given(*at, &("gear".into(), None)).is_some() {
            continue;
        }
        for member in &def.members {
            let Some(part) = eval.shared.parts.get(member) else { continue };
            let has_gears =
                part.row.is_some_and(|row| row.fields.iter().any(|field| field.shape == Shape::Gears));
            if !has_gears {
                continue;
            }
            for ((field, name), given) in &part.fields {
                if let (true, Some(name)) = (&**field == "gear", name)
                    && !names.iter().any(|(.., known)| known == name)
                {
                    names.push((*member, given.entry.span, name.clone()));
                }
            }
        }
    }
    names.sort_by_key(|(member, span, _)| (*member, *span));
    names.into_iter().map(|(.., name)| name).collect()
}
