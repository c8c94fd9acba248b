//! The table of kinds: every row is whole, its units are units of it, and messages call it by its name.

use layshaft_units::{KINDS, Scale, Type, demand, interpret_unit, kind, parse_unit};

#[test]
fn every_row_is_whole() {
    for (index, row) in KINDS.iter().enumerate() {
        assert!(row.name.chars().all(|c| c.is_ascii_lowercase() || c == '_'), "{}", row.name);
        assert!(!row.title.is_empty() && !row.meaning.is_empty(), "{}", row.name);
        assert!(KINDS[..index].iter().all(|other| other.name != row.name), "{} twice", row.name);
        assert_eq!(kind(row.name), Some(row));
        assert_eq!(row.units.first().copied().unwrap_or_default(), row.unit, "{}", row.name);
        assert_eq!(demand(&row.ty(), row), Ok(None), "{}", row.name);
    }
}

#[test]
fn every_unit_offered_fits_its_kind() {
    for row in KINDS {
        for text in row.units.iter().filter(|text| !text.is_empty()) {
            let unit = parse_unit(text).unwrap_or_else(|error| panic!("{text}: {error:?}"));
            assert_eq!(unit.text, *text, "{}", row.name);
            let read = interpret_unit(&unit, &row.ty()).unwrap_or_else(|error| panic!("{text}: {error:?}"));
            assert_eq!(demand(&read.ty, row), Ok(None), "{text} for {}", row.name);
        }
    }
}

#[test]
fn the_si_unit_of_a_kind_has_the_factor_one() {
    for row in KINDS.iter().filter(|row| !row.si.is_empty()) {
        let unit = parse_unit(row.si).unwrap_or_else(|error| panic!("{}: {error:?}", row.si));
        assert_eq!((unit.text.as_str(), unit.factor, unit.offset), (row.si, 1.0, 0.0), "{}", row.name);
        assert_eq!(unit.ty.dim, row.ty().dim, "{}", row.name);
        let read = interpret_unit(&unit, &row.ty()).unwrap_or_else(|error| panic!("{}: {error:?}", row.si));
        assert_eq!(demand(&read.ty, row), Ok(None), "{} for {}", row.si, row.name);
    }
}

#[test]
fn a_value_is_called_by_the_name_of_its_kind() {
    for (name, words) in [
        ("torque", "a torque"),
        ("energy", "an energy"),
        ("rotational_speed", "a rotational speed"),
        ("frequency", "a frequency"),
        ("length", "a length"),
        ("lead", "a lead"),
        ("mechanical_power", "a mechanical power"),
        ("moment_of_inertia", "a moment of inertia"),
        ("flywheel_effect", "a flywheel effect"),
        ("temperature", "a temperature"),
        ("temperature_difference", "a temperature difference"),
        ("angle", "an angle"),
        ("percentage", "a plain number"),
        ("grade", "a grade"),
        ("gauge_pressure", "a gauge pressure"),
    ] {
        assert_eq!(kind(name).map(|kind| kind.ty().describe()).as_deref(), Some(words));
    }
    let described = |unit: &str| parse_unit(unit).map(|unit| unit.ty.describe());
    assert_eq!(described("kg·m²").as_deref(), Ok("a moment of inertia"));
    assert_eq!(described("N·m·s").as_deref(), Ok("an angular momentum or a viscous torque coefficient"));
    assert_eq!(described("W/rad").as_deref(), Ok("a quantity in W/rad"));
    assert_eq!(described("kg·m").as_deref(), Ok("a quantity in kg·m"));
    assert_eq!(described("V·s").as_deref(), Ok("a quantity in V·s"));
    assert_eq!(described("N·s²").as_deref(), Ok("a quantity in kg·m"));
    assert_eq!(described("m⁴").as_deref(), Ok("a quantity in m⁴"));
    assert_eq!(described("barg").as_deref(), Ok("a gauge pressure"));
    assert_eq!(described("rad²").as_deref(), Ok("a quantity in rad²"));
    assert_eq!(Type::pi().describe(), "a plain number");
}

#[test]
fn a_number_knows_what_it_is() {
    assert!(Type::number().is_plain_number() && Type::pi().is_plain_number());
    assert!(Type::of_number_literal(0.0).is_bare_zero() && !Type::of_number_literal(0.1).is_bare_zero());
    assert!(!Type::of_number_literal(0.0).named().is_bare_zero());
    assert_eq!(kind("temperature").map(|kind| kind.ty().scale), Some(Scale::Level));
    assert_eq!(kind("no_such_kind"), None);
}
