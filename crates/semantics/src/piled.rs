//! Margins that multiply: a factor on the load, one in a setting, one in a criterion, each against the same doubt.

use layshaft_diagnostics::{Code, Diagnostic};
use layshaft_mechanics::registry::Role;
use layshaft_syntax::{BinaryOp, CompareOp, Expr, ExprKind, ItemKind, Path, ValueKind};

use crate::eval::Shared;
use crate::say::plain;
use crate::world::{Declared, ItemRef};

/// Two factors are remarked on from this product on; three always are. Common practice, no source.
const MUCH: f64 = 1.75;
/// A factor on a load above this is no margin but a count: `2 * wheel_mass`. Common practice, no source.
const MOST_FACTOR: f64 = 2.0;

/// A margin and where it is put in.
struct Margin {
    factor: f64,
    place: String,
}

/// Reports each criterion whose own margin stands upon others.
pub(crate) fn report(shared: Shared<'_>) {
    for (at, tree) in shared.world.items(0) {
        let ItemKind::Require { condition, .. } = &tree.kind else { continue };
        let Some((path, factor)) = own_margin(condition) else { continue };
        let Some((Declared::Drive, drive, _)) = shared.world.head(at.file, &path.names) else { continue };
        let mut margins = vec![Margin { factor, place: "here".to_owned() }];
        margins.extend(setting(shared, drive, path));
        margins.extend(loads(shared, drive));
        let total: f64 = margins.iter().map(|margin| margin.factor).product();
        if margins.len() < 2 || (margins.len() == 2 && total < MUCH) {
            continue;
        }
        let factors: Vec<String> =
            margins.iter().map(|margin| format!("{} ({})", plain(margin.factor), margin.place)).collect();
        let message =
            format!("margins are piled on margins: {} make {} in all", factors.join(" × "), plain(total));
        let place = shared.world.place(at, condition.span);
        shared.sink.push(
            Diagnostic::new(Code::PiledMargins, place, message)
                .help("put one margin where the doubt is, or accept this with the reason for each"),
        );
    }
}

/// The margin a criterion asks for by itself: `d.run_up_reserve >= 1.25`, `d.m.torque <= 0.8 * m.rated_torque`.
fn own_margin(condition: &Expr) -> Option<(&Path, f64)> {
    let ExprKind::Compare { first, rest } = &condition.kind else { return None };
    let [(op, _, second)] = rest.as_slice() else { return None };
    let upper = match op {
        CompareOp::Less | CompareOp::LessEqual => true,
        CompareOp::Greater | CompareOp::GreaterEqual => false,
        CompareOp::Equal | CompareOp::NotEqual => return None,
    };
    let (path, upper, limit) = match (&first.kind, &second.kind) {
        (ExprKind::Path(path), _) if path.names.len() > 1 => (path, upper, second),
        (_, ExprKind::Path(path)) if path.names.len() > 1 => (path, !upper, &**first),
        _ => return None,
    };
    let factor = if upper {
        1.0 / factor_of(limit)?
    } else {
        number(limit).filter(|_| path.names.last().is_some_and(|name| name.text.ends_with("_reserve")))?
    };
    (factor.is_finite() && factor > 1.0).then_some((path, factor))
}

/// The application factor of the drive counts at the parts it is judged at: those between source and load.
fn setting(shared: Shared<'_>, drive: ItemRef, path: &Path) -> Option<Margin> {
    let def = shared.drives.get(&drive)?;
    let part = path.names.get(1).and_then(|name| shared.world.find(0, &name.text))?.1;
    if shared.parts.get(&part)?.role != Role::Transmission {
        return None;
    }
    let given = def.settings.get(&("application_factor".into(), None))?;
    let ValueKind::Expr(expr) = &given.value.kind else { return None };
    let factor = number(expr).filter(|factor| *factor > 1.0)?;
    Some(Margin { factor, place: "application_factor".to_owned() })
}

/// Factors that stand on fields of the loads themselves: `mass = 1.25 * rated_load`.
fn loads(shared: Shared<'_>, drive: ItemRef) -> Vec<Margin> {
    let mut found = Vec::new();
    let members = shared.drives.get(&drive).map_or(&[][..], |def| &def.members);
    for part in members.iter().filter_map(|member| shared.parts.get(member)) {
        if part.role != Role::Load {
            continue;
        }
        for (slot, given) in &part.fields {
            let ValueKind::Expr(expr) = &given.value.kind else { continue };
            if let Some(factor) = factor_of(expr).filter(|factor| *factor > 1.0 && *factor < MOST_FACTOR) {
                found.push(Margin { factor, place: format!("{}.{}", part.name.text, slot.0) });
            }
        }
    }
    found
}

/// The number that multiplies a name, also within a sum.
fn factor_of(expr: &Expr) -> Option<f64> {
    match &expr.kind {
        ExprKind::Paren(inner) => factor_of(inner),
        ExprKind::Binary { op: BinaryOp::Add, left, right, .. } => {
            factor_of(left).or_else(|| factor_of(right))
        }
        ExprKind::Binary { op: BinaryOp::Multiply, left, right, .. } => match (&left.kind, &right.kind) {
            (_, ExprKind::Path(_) | ExprKind::Rated) => number(left),
            (ExprKind::Path(_) | ExprKind::Rated, _) => number(right),
            _ => None,
        },
        _ => None,
    }
}

/// A plain number or a percentage as it is typed.
fn number(expr: &Expr) -> Option<f64> {
    match &expr.kind {
        ExprKind::Paren(inner) => number(inner),
        ExprKind::Quantity { number, unit: None } => Some(number.value),
        ExprKind::Quantity { number, unit: Some(unit) } if &*unit.text == "%" => Some(number.value / 100.0),
        _ => None,
    }
}
