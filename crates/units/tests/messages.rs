//! The words of refusals: what is wrong in the trade's terms, and what to write instead.

use layshaft_units::{
    Function, Refusal, TurnWarning, Type, add, apply, compare, demand, kind, multiply, parse_unit, power,
};

fn named(name: &str) -> Type {
    kind(name).unwrap_or_else(|| panic!("{name}")).ty()
}

fn literal(unit: &str) -> Type {
    parse_unit(unit).unwrap_or_else(|error| panic!("{error:?}")).ty
}

fn product(names: &[&str]) -> Type {
    names
        .iter()
        .fold(Type::number(), |ty, name| multiply(&ty, &named(name)).unwrap_or_else(|why| panic!("{why:?}")))
}

/// Message and hints, joined.
fn said(refusal: Result<Option<TurnWarning>, Refusal>) -> (String, String) {
    match refusal {
        Ok(Some(warning)) => (warning.message(), warning.hints().join(" | ")),
        Ok(None) => ("fits".to_owned(), String::new()),
        Err(refusal) => (refusal.message(), refusal.hints().join(" | ")),
    }
}

fn wanted(found: Type, name: &str) -> (String, String) {
    said(demand(&found, kind(name).unwrap_or_else(|| panic!("{name}"))))
}

#[test]
fn a_wrong_value_is_named_with_what_to_write() {
    for (found, place, message, hint) in [
        (named("energy"), "torque", "a torque is wanted here, this is an energy", "`N·m`"),
        (named("frequency"), "rotational_speed", "this is a frequency", "`rpm` or `rev/s`"),
        (named("rotational_speed"), "rate", "this is a rotational speed", "`n / (1 rev)`"),
        (named("mass"), "force", "this is a mass", "`m * 9.80665 m/s²`"),
        (named("mass"), "force", "this is a mass", "`kgf`"),
        (named("force"), "torque", "this is a force", "`F * r`"),
        (named("grade"), "slope", "this is a grade", "`atan(grade)`"),
        (named("flywheel_effect"), "moment_of_inertia", "a flywheel effect (GD²)", "`GD2 / 4`"),
        (named("moment_of_inertia"), "flywheel_effect", "a moment of inertia", "`4 * J`"),
        (named("electrical_power"), "mechanical_power", "an electrical power", "efficiency"),
        (literal("kg·cm"), "torque", "a quantity in kg·m", "`kgf`"),
        (literal("kg/cm²"), "pressure", "a mass per area", "`kgf`"),
        (literal("nm"), "torque", "a length", "the newton metre is `N·m`"),
        (literal("C"), "temperature", "a charge", "`°C`"),
        (literal("°C"), "temperature_difference", "a temperature", "`K`"),
        (literal("V·s"), "voltage_constant", "a quantity in V·s", "`V·s/rad`"),
        (Type::of_number_literal(3.0), "torque", "a plain number", "`N·m`"),
    ] {
        let (text, hints) = wanted(found, place);
        assert!(text.contains(message), "{text}");
        assert!(hints.contains(hint), "{text}: {hints}");
    }
}

#[test]
fn a_frequency_in_the_place_of_a_rotational_speed_is_told_from_uncounted_radians() {
    let (text, hints) = wanted(product(&["torque", "frequency"]), "power");
    assert_eq!(text, "a power is wanted here, this is a quantity in W/rad");
    assert!(hints.contains("`2 * pi * f`") && !hints.contains("1 rad"), "{hints}");
    for formula in [["mass", "speed", "rotational_speed"], ["number", "speed", "rotational_speed"]] {
        let place = if formula[0] == "mass" { "force" } else { "acceleration" };
        let (text, hints) = wanted(product(&formula), place);
        assert!(hints.contains("`(…) / (1 rad)`"), "{text}: {hints}");
    }
    let gyroscopic = product(&["moment_of_inertia", "rotational_speed", "rotational_speed"]);
    assert!(wanted(gyroscopic, "torque").1.contains("`(…) / (1 rad)`"));
    // A torque is no energy with its radians miscounted.
    assert!(!wanted(named("torque"), "energy").1.contains("1 rad"));
    assert!(!wanted(named("rotational_speed"), "frequency").1.contains("1 rad"));
}

#[test]
fn a_turn_counted_twice_says_so() {
    let shaft = multiply(&product(&["torque", "rotational_speed"]), &Type::pi());
    let (text, hints) = shaft.map(|ty| wanted(ty, "power")).unwrap_or_default();
    assert_eq!(text, "π and the radians of a rotational speed count one turn twice, so this is no power");
    assert!(hints.contains("without π"), "{hints}");
}

#[test]
fn sums_comparisons_and_functions_say_what_does_not_go_together() {
    let torque = named("torque");
    for (result, message) in [
        (add(&torque, &named("energy")), "these have no sum: a torque and an energy: they share a dimension"),
        (add(&torque, &named("force")), "these have no sum: a torque and a force"),
        (
            add(&named("mechanical_power"), &named("electrical_power")),
            "a mechanical power and an electrical power",
        ),
        (add(&named("temperature"), &named("temperature")), "two temperatures have no sum"),
        (
            compare(&named("rotational_speed"), &named("frequency")),
            "these cannot be compared: a rotational speed",
        ),
        (multiply(&named("temperature"), &torque), "a temperature cannot be multiplied"),
        (apply(Function::Sin, &[Type::number()]), "`sin` wants an angle, this is a plain number"),
        (apply(Function::Round, &[named("length")]), "`round` wants a plain number, this is a length"),
        (apply(Function::Min, &[torque]), "`min` takes two values or more, not 1"),
        (power(&named("mass"), 37, 100), "a mass to the power 37/100"),
    ] {
        let text = result.map_or_else(|refusal| refusal.message(), |ty| ty.describe());
        assert!(text.contains(message), "{text}");
    }
}
