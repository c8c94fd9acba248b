//! The unit table against published conversion factors; the numbers and their sources stand in `units.json`.

use layshaft_units::{Function, Type, Unit, apply, demand, divide, kind, multiply, parse_unit};
use serde_json::Value;

fn data() -> Value {
    serde_json::from_str(include_str!("units.json")).unwrap_or_else(|error| panic!("units.json: {error}"))
}

fn rows<'a>(of: &'a Value, key: &str) -> &'a [Value] {
    of[key].as_array().map_or(&[], Vec::as_slice)
}

fn text<'a>(row: &'a Value, key: &str) -> &'a str {
    row[key].as_str().unwrap_or_else(|| panic!("no `{key}` in {row}"))
}

fn number(row: &Value, key: &str) -> f64 {
    row[key].as_f64().unwrap_or_else(|| panic!("no number `{key}` in {row}"))
}

fn unit(text: &str) -> Unit {
    // A plain number has no unit: its factor is 1.
    parse_unit(if text.is_empty() { "1" } else { text }).unwrap_or_else(|error| panic!("{text}: {error:?}"))
}

/// A quantity written as number, blank and unit, in SI units.
fn quantity(text: &str) -> (f64, Type) {
    let (number, symbol) = text.split_once(' ').unwrap_or((text, ""));
    let unit = unit(symbol);
    let value: f64 = number.parse().unwrap_or_else(|_| panic!("no number in {text}"));
    (unit.to_si(value), unit.ty)
}

/// The value a row asks for, in its unit, computed through the algebra as an expression would be.
fn found(row: &Value) -> f64 {
    let mut product: Option<(f64, Type)> = None;
    for factor in rows(row, "of") {
        let (value, ty) = quantity(factor.as_str().unwrap_or_default());
        product = Some(match product {
            None => (value, ty),
            Some((before, of)) => {
                (before * value, multiply(&of, &ty).unwrap_or_else(|why| panic!("{row}: {why:?}")))
            }
        });
    }
    let (mut value, mut ty) = product.unwrap_or_else(|| panic!("nothing in {row}"));
    for divisor in rows(row, "over") {
        let (by, of) = quantity(divisor.as_str().unwrap_or_default());
        (value, ty) = (value / by, divide(&ty, &of).unwrap_or_else(|why| panic!("{row}: {why:?}")));
    }
    for name in rows(row, "apply") {
        let function =
            Function::from_name(name.as_str().unwrap_or_default()).unwrap_or_else(|| panic!("{row}"));
        ty = apply(function, &[ty]).unwrap_or_else(|why| panic!("{row}: {why:?}"));
        value = function.evaluate(&[value]).unwrap_or(f64::NAN);
    }
    let shown = unit(text(row, "in"));
    assert_eq!(ty.dim, shown.ty.dim, "{row}");
    assert!(ty.angle == shown.ty.angle || ty.angle == layshaft_units::Angle::Free, "{row}: {ty:?}");
    let difference = row["difference"].as_bool().unwrap_or(false);
    if difference { shown.as_difference().from_si(value) } else { shown.from_si(value) }
}

fn close(found: f64, wanted: f64, rel: f64) -> bool {
    (found - wanted).abs() <= rel * wanted.abs()
}

#[test]
fn published_factors() {
    let data = data();
    let mut wrong = Vec::new();
    let mut count = 0;
    for check in rows(&data, "checks") {
        assert!(!text(check, "source").is_empty(), "{check}");
        for row in rows(check, "rows") {
            let (found, wanted) = (found(row), number(row, "value"));
            count += 1;
            if !close(found, wanted, number(row, "rel")) {
                wrong.push(format!("{}: {row} gives {found}", text(check, "name")));
            }
        }
    }
    assert!(wrong.is_empty(), "{wrong:#?}");
    assert!(count >= 32, "only {count} rows");
}

#[test]
fn factors_are_the_double_nearest_to_their_fraction() {
    let data = data();
    let all = rows(&data["fractions"], "rows");
    assert_eq!(all.len(), 17);
    for row in all {
        assert_eq!(unit(text(row, "unit")).factor, number(row, "value"), "{row}");
    }
}

#[test]
fn other_factors_are_rounded_as_recorded() {
    let data = data();
    for row in rows(&data["rounded"], "rows") {
        let found = number(row, "theirs") / unit(text(row, "unit")).factor - 1.0;
        assert!(close(found, number(row, "difference"), number(row, "rel")), "{row}: {found:e}");
    }
}

#[test]
fn horsepower_is_a_power_and_a_rise_is_no_temperature() {
    let place = |name| kind(name).unwrap_or_else(|| panic!("{name}"));
    assert_eq!(demand(&unit("hp").ty, place("mechanical_power")), Ok(None));
    assert!(demand(&unit("°F").ty, place("temperature_difference")).is_err());
    assert!(demand(&unit("%").ty, place("angle")).is_err());
}

#[test]
fn every_unit_can_be_written_behind_a_number() {
    let files = layshaft_semantics::NoFiles;
    for row in layshaft_units::unit_rows() {
        let spec = format!("let x = 3 {}\n", row.symbol);
        let analysis = layshaft_semantics::analyze("units.shaft", spec.as_str().into(), &files);
        let unread: Vec<_> = analysis
            .diagnostics
            .iter()
            .filter(|found| found.code == layshaft_diagnostics::Code::Syntax)
            .collect();
        assert!(unread.is_empty(), "{}: {unread:?}", row.symbol);
    }
}
