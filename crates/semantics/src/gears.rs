//! Gears nobody engaged and layers of rope nobody named: all gears are solved and shown, and the first and the top
//! layer; none is chosen silently.

use layshaft_diagnostics::Span;
use layshaft_mechanics::registry::Shape;

use crate::eval::Eval;
use crate::world::ItemRef;

/// The gears to solve where a drive has a gearbox and the spec engages none; neutral is none of them.
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
                    && !crate::fields::is_neutral(given.value)
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

/// Whether a drum in a drive has several layers and the spec leaves open on which the rope runs.
pub(crate) fn open_layers(eval: &Eval<'_>) -> bool {
    let open = |member: &ItemRef| {
        let part = eval.shared.parts.get(member)?;
        let has_layers = part.row?.fields.iter().any(|field| field.name == "layer");
        if !has_layers || eval.given(*member, &("layer".into(), None)).is_some() {
            return None;
        }
        eval.built(*member)?.values.si("layers").filter(|layers| *layers > 1.0)
    };
    eval.shared.drives.values().any(|def| def.members.iter().any(|member| open(member).is_some()))
}
