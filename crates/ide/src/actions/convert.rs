//! Writes a number in another unit of its kind, so that its value stays the same to the bit.

use layshaft_diagnostics::{Edit, FileSpan};
use layshaft_present::unit::kind_of;
use layshaft_syntax::{Expr, ExprKind, ItemKind, ToleranceForm};
use layshaft_units::{Type, Unit, interpret_unit, parse_unit};

use super::{ActionKind, Claim, Offer, Place};
use crate::{hover, tree};

/// Units offered.
const MOST: usize = 6;

/// The number under the cursor in each other usual unit of its kind.
pub(super) fn offers(place: &Place<'_>) -> Vec<Offer> {
    let Some(item) = place.item else { return Vec::new() };
    let here = place.span.start.saturating_sub(item.offset);
    let holding = tree::holding(&item.tree, here);
    let Some(at) = holding.iter().rposition(|expr| matches!(expr.kind, ExprKind::Quantity { .. })) else {
        return Vec::new();
    };
    let ExprKind::Quantity { number, unit: Some(written) } = &holding[at].kind else { return Vec::new() };
    let outer = at.checked_sub(1).map(|outer| holding[outer]);
    if outer.is_some_and(|outer| leans(outer, holding[at])) {
        return Vec::new();
    }
    let Ok(parsed) = parse_unit(&written.text) else { return Vec::new() };
    // Where the analysis has settled its kind, the unit means what it means there: `1/min` of a rotational speed.
    let settled = hover::recorded(place.snapshot, place.file, item, holding[at].span);
    let wanted = settled.as_ref().map_or(parsed.ty, |found| found.ty);
    let Some(own) = meant(&parsed, &wanted) else { return Vec::new() };
    let Some(kind) = kind_of(&wanted).or_else(|| kind_of(&own.ty)) else { return Vec::new() };
    let si = own.to_si(number.value);
    if !si.is_finite() {
        return Vec::new();
    }
    let whole = FileSpan { file: place.file, span: number.span.cover(written.span).shifted(item.offset) };
    // What a case puts there may be part of its name.
    let claim = match &item.tree.kind {
        ItemKind::Let { .. } | ItemKind::Part { .. } | ItemKind::Drive { .. } => Claim::Proved,
        _ => Claim::Unchanged,
    };
    let offer = |unit: &&&str| {
        let other = meant(&parse_unit(unit).ok()?, &wanted)?;
        if other.ty != own.ty || other.text == own.text {
            return None;
        }
        let text = format!("{} {unit}", exactly(si, &other)?);
        Some(Offer {
            title: format!("write `{text}`"),
            kind: ActionKind::Rewrite,
            edits: vec![Edit { place: whole, text }],
            mends: None,
            preferred: false,
            claim,
        })
    };
    kind.units.iter().filter(|unit| !unit.is_empty()).filter_map(|unit| offer(&unit)).take(MOST).collect()
}

/// The unit as it is meant where a type is wanted; none where it has to be chosen.
fn meant(unit: &Unit, wanted: &Type) -> Option<Unit> {
    interpret_unit(unit, wanted).ok()
}

/// Whether another number of an expression takes its unit from this one, or this one is no value but a width.
fn leans(outer: &Expr, this: &Expr) -> bool {
    let bare = |expr: &Expr| matches!(expr.kind, ExprKind::Quantity { unit: None, .. });
    match &outer.kind {
        ExprKind::Tolerance { value, tolerance, form, .. } => {
            tolerance.span == this.span || bare(value) || bare(tolerance) || *form != ToleranceForm::Plain
        }
        ExprKind::Within { value, low, high } => [value, low, high].into_iter().any(|expr| bare(expr)),
        // `T²` of a temperature is one of its unit.
        ExprKind::Power { .. } => true,
        _ => false,
    }
}

/// The shortest decimal whose value in the unit is this one to the bit; none where there is none that a person would
/// keep.
pub(super) fn exactly(si: f64, unit: &Unit) -> Option<String> {
    let near = unit.from_si(si);
    if !near.is_finite() || (near != 0.0 && !(1e-6..1e9).contains(&near.abs())) {
        return None;
    }
    (0..=16).find_map(|digits| {
        let text = plainly(near, digits)?;
        let value: f64 = text.parse().ok()?;
        (unit.to_si(value).to_bits() == si.to_bits()).then_some(text)
    })
}

/// A number with so many digits behind the first, without a power of ten and without zeros that say nothing.
pub(super) fn plainly(value: f64, digits: usize) -> Option<String> {
    let rounded: f64 = format!("{value:.digits$e}").parse().ok()?;
    let text = format!("{rounded}");
    (!text.contains(['e', 'E']) && text.len() <= 22).then_some(text)
}

#[cfg(test)]
mod tests {
    use layshaft_units::parse_unit;

    use super::exactly;

    #[test]
    fn the_shortest_decimal_that_is_the_same_to_the_bit() {
        let check = |value: f64, from: &str, to: &str, expected: &str| {
            let (from, to) = (parse_unit(from).expect("a unit"), parse_unit(to).expect("a unit"));
            assert_eq!(exactly(from.to_si(value), &to).as_deref(), Some(expected));
        };
        check(5.5, "kW", "W", "5500");
        check(36.0, "km/h", "m/s", "10");
        check(1.0, "in", "mm", "25.4");
        check(20.0, "°C", "K", "293.15");
        check(0.1, "N·m", "mN·m", "100");
        // As many digits as it takes; where no decimal is the same to the bit there is none.
        let kilograms = parse_unit("kg").expect("a unit").to_si(40.0);
        let pound = parse_unit("lb").expect("a unit");
        let text = exactly(kilograms, &pound).expect("there is one");
        assert_eq!(pound.to_si(text.parse().expect("a number")).to_bits(), kilograms.to_bits());
        let (watts, horse) =
            (parse_unit("kW").expect("a unit").to_si(4.0), parse_unit("hp").expect("a unit"));
        assert!(exactly(watts, &horse).is_none_or(|text| horse.to_si(text.parse().unwrap_or(0.0)) == watts));
    }
}
