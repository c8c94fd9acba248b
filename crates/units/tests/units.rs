//! Units: spellings, factors, refusals with their choices, suggestions, and what a literal means in its place.

use layshaft_units::{UnitError, interpret_unit, kind, parse_unit, replacements, unit_symbol};

fn text(unit: &str) -> String {
    parse_unit(unit).map_or_else(|error| panic!("{unit}: {error:?}"), |unit| unit.text)
}

fn factor(unit: &str) -> f64 {
    parse_unit(unit).map_or_else(|error| panic!("{unit}: {error:?}"), |unit| unit.factor)
}

fn refusal(unit: &str) -> UnitError {
    parse_unit(unit).map_or_else(|error| error, |unit| panic!("{unit:?} is read"))
}

#[test]
fn one_spelling_is_written() {
    for (written, canonical) in [
        ("kg*m^2", "kg·m²"),
        ("kg·m²", "kg·m²"),
        ("N·m/(rad/s)^2", "N·m/(rad/s)²"),
        ("N*m*s^2/rad^2", "N·m·s²/rad²"),
        ("1/min", "1/min"),
        ("min^-1", "min⁻¹"),
        ("min⁻¹", "min⁻¹"),
        ("W/(m²·K)", "W/(m²·K)"),
        ("mOhm", "mΩ"),
        ("um", "μm"),
        ("deg/s", "°/s"),
        ("r/min", "rev/min"),
        ("degC", "°C"),
        ("%/degC", "%/°C"),
        ("L/min", "l/min"),
        ("kp", "kgf"),
        ("Nm", "N·m"),
        ("kNm", "kN·m"),
        ("Nm/A", "N·m/A"),
        ("W/Nm", "W/(N·m)"),
        ("(Nm)^2", "(N·m)²"),
        ("rpm/(Nm)", "rpm/(N·m)"),
        ("(N·m)", "N·m"),
        ("(N·m)/A", "N·m/A"),
        ("((m))/s", "m/s"),
        ("W/(m)", "W/m"),
        ("(rad/s)/V", "(rad/s)/V"),
        ("lbm", "lb"),
        ("inch", "in"),
        ("N⋅m", "N·m"),
        ("m÷s", "m/s"),
        ("m^1", "m"),
    ] {
        assert_eq!(text(written), canonical, "{written}");
        assert_eq!(parse_unit(written), parse_unit(canonical), "{written}");
    }
}

#[test]
fn factors_are_exact() {
    for (unit, exact) in [
        ("hp", 745.699_871_582_270_2),
        ("PS", 735.498_75),
        ("lbf·ft", 1.355_817_948_331_400_4),
        ("lbf·in", 0.112_984_829_027_616_7),
        ("ozf·in", 0.007_061_551_814_226_043_5),
        ("kgf·cm", 0.098_066_5),
        ("psi", 6_894.757_293_168_362),
        ("kgf/cm²", 98_066.5),
        ("mph", 0.447_04),
        ("km/h", 1.0 / 3.6),
        ("kn", 1852.0 / 3600.0),
        ("lb·ft²", 0.042_140_110_093_804_8),
        ("slug", 14.593_902_937_206_364),
        ("slug·ft²", 1.355_817_948_331_400_4),
        ("gal_us", 0.003_785_411_784),
        ("gal_imp", 0.004_546_09),
        ("g·cm²", 1e-7),
        ("g/kWh", 1e-3 / 3.6e6),
        ("kWh", 3.6e6),
        ("mAh", 3.6),
        ("cSt", 1e-6),
        ("inH2O", 249.088_91),
        ("cfm", 0.000_471_947_443_2),
    ] {
        assert_eq!(factor(unit), exact, "{unit}");
    }
    let pi = std::f64::consts::PI;
    for (unit, exact) in [
        ("rpm", pi / 30.0),
        ("rev/min", pi / 30.0),
        ("°", pi / 180.0),
        ("krpm", pi / 0.03),
        ("V/krpm", 0.03 / pi),
        ("cm³/rev", 1e-6 / (2.0 * pi)),
        ("N·m/rpm²", 900.0 / (pi * pi)),
        ("mm/rev", 1e-3 / (2.0 * pi)),
        ("J/rev", 1.0 / (2.0 * pi)),
    ] {
        let found = factor(unit);
        assert!(((found - exact) / exact).abs() < 4e-16, "{unit}: {found} for {exact}");
    }
}

#[test]
fn temperatures_are_levels_alone_and_kelvins_in_a_compound() {
    let celsius = parse_unit("°C").map(|unit| (unit.to_si(40.0), unit.as_difference().to_si(40.0)));
    assert_eq!(celsius, Ok((313.15, 40.0)));
    let fahrenheit = parse_unit("°F").map(|unit| unit.from_si(313.15));
    assert!(fahrenheit.is_ok_and(|value| (value - 104.0).abs() < 1e-12));
    assert_eq!(factor("%/°C"), 0.01);
    assert_eq!(factor("W/°F"), 1.8);
}

#[test]
fn what_two_trades_read_differently_is_refused() {
    for (unit, choices) in [
        ("ft·lb", vec!["ft·lbf", "J"]),
        ("lb·ft", vec!["lbf·ft", "J"]),
        ("in*lb", vec!["in·lbf", "J"]),
        ("oz·in", vec!["ozf·in", "g·mm"]),
        ("lb·ft/A", vec!["lbf·ft/A", "kg·ft/A"]),
        ("ton", vec!["t", "short_ton", "long_ton"]),
        ("HP", vec!["hp", "PS"]),
        ("cv", vec!["hp", "PS"]),
        ("gal", vec!["gal_us", "gal_imp"]),
        ("gal/min", vec!["gal_us", "gal_imp"]),
        ("gpm", vec!["gal_us/min", "gal_imp/min"]),
        ("kt", vec!["kn", "t"]),
        ("Btu/h", vec!["kJ", "kW"]),
    ] {
        let UnitError::Ambiguous { choices: found, .. } = refusal(unit) else { panic!("{unit}") };
        let units: Vec<&str> = found.iter().map(|(unit, _)| unit.as_str()).collect();
        assert_eq!(units, choices, "{unit}");
        for unit in units {
            assert!(parse_unit(unit).is_ok(), "the choice {unit} is no unit");
        }
    }
    for unit in ["lb·ft²", "lb·ft/s²", "lb·ft/s", "lb/ft", "lb/h", "oz·in²"] {
        assert!(parse_unit(unit).is_ok(), "{unit}");
    }
}

#[test]
fn a_second_operator_behind_a_slash_is_refused_with_both_readings() {
    for (unit, first, second) in [
        ("W/m²·K", "W/(m²·K)", "W·K/m²"),
        ("m/s/s", "m/(s·s)", "m/(s/s)"),
        ("J/kg·K", "J/(kg·K)", "J·K/kg"),
        ("N·m/A/s", "N·m/(A·s)", "N·m/(A/s)"),
        ("a/b", "", ""),
        ("kg/m·s/K", "kg/(m·s·K)", "kg·s/(m·K)"),
    ] {
        match refusal(unit) {
            UnitError::TwoReadings { at, choices } => {
                assert_eq!(at, (0, unit.len()));
                let found: Vec<&str> = choices.iter().map(|(unit, _)| unit.as_str()).collect();
                assert_eq!(found, [first, second], "{unit}");
                assert!(found.iter().all(|unit| parse_unit(unit).is_ok()), "{unit}");
            }
            UnitError::Unknown { .. } if first.is_empty() => {}
            other => panic!("{unit}: {other:?}"),
        }
    }
    assert!(matches!(refusal("N·m/(W/m²·K)"), UnitError::TwoReadings { at: (6, 14), .. }));
}

#[test]
fn unknown_units_get_the_likeliest_spelling() {
    for (unit, symbol, suggested) in [
        ("KW", "KW", "kW"),
        ("RPM", "RPM", "rpm"),
        ("Rpm", "Rpm", "rpm"),
        ("kw", "kw", "kW"),
        ("Kg", "Kg", "kg"),
        ("KG", "KG", "kg"),
        ("m2", "m2", "m²"),
        ("kg*m2", "m2", "m²"),
        ("kgm2", "kgm2", "kg·m²"),
        ("Nms", "Nms", "N·m·s"),
        ("kmh", "kmh", "km/h"),
        ("kph", "kph", "km/h"),
        ("lbs", "lbs", "lb"),
        ("sec", "sec", "s"),
        ("hours", "hours", "h"),
        ("M", "M", "m"),
        ("Bar", "Bar", "bar"),
        ("PSI", "PSI", "psi"),
        ("volts", "volts", "V"),
        ("lbft", "lbft", "lbf·ft"),
        ("kgff", "kgff", "kgf"),
        ("cc/rev", "cc", "cm³"),
    ] {
        let UnitError::Unknown { symbol: found, suggestions, at } = refusal(unit) else { panic!("{unit}") };
        assert_eq!(found, symbol);
        assert_eq!(unit.get(at.0..at.1), Some(symbol));
        assert!(suggestions.iter().any(|s| s == suggested), "{unit}: {suggestions:?}");
    }
    let UnitError::Unknown { suggestions, .. } = refusal("furlongs") else { panic!("known") };
    assert!(suggestions.is_empty(), "{suggestions:?}");
}

#[test]
fn text_that_is_no_unit_says_where() {
    for (unit, at) in [
        ("", (0, 0)),
        ("N·", (3, 3)),
        ("/s", (0, 1)),
        ("N m", (1, 3)),
        ("lbf-ft", (3, 4)),
        ("(N·m", (0, 5)),
        ("N)", (1, 2)),
        ("m^0.5", (1, 5)),
        ("m^", (1, 2)),
        ("m²⁰", (1, 6)),
        ("Nm²", (0, 4)),
        ("m·1", (3, 4)),
        ("barg·l/min", (0, 11)),
        ("((((((((((m))))))))))", (8, 9)),
    ] {
        let UnitError::Syntax { at: found, message } = refusal(unit) else {
            panic!("{unit}: {:?}", refusal(unit))
        };
        assert_eq!(found, at, "{unit}: {message}");
    }
    assert!(matches!(refusal("((Tm)^9)^9"), UnitError::Syntax { .. }));
    assert!(matches!(refusal(&"m·".repeat(1000)), UnitError::Syntax { .. }));
}

fn in_place(unit: &str, wanted: &str) -> Result<f64, Vec<String>> {
    let place = kind(wanted).unwrap_or_else(|| panic!("{wanted}")).ty();
    let unit = parse_unit(unit).unwrap_or_else(|error| panic!("{error:?}"));
    interpret_unit(&unit, &place).map(|unit| unit.to_si(1.0)).map_err(|error| match error {
        UnitError::Ambiguous { choices, .. } => choices.into_iter().map(|(unit, _)| unit).collect(),
        other => panic!("{other:?}"),
    })
}

#[test]
fn the_place_settles_what_a_literal_means() {
    let pi = std::f64::consts::PI;
    assert_eq!(in_place("min⁻¹", "rotational_speed"), Ok(pi / 30.0));
    assert_eq!(in_place("1/min", "rotational_speed"), Ok(pi / 30.0));
    assert_eq!(in_place("1/min", "rate"), Ok(1.0 / 60.0));
    assert_eq!(in_place("1/s", "frequency"), Ok(1.0));
    for unit in ["1/s", "s⁻¹"] {
        assert_eq!(in_place(unit, "rotational_speed"), Err(vec!["rad/s".to_owned(), "rev/s".to_owned()]));
    }
    assert_eq!(in_place("lb", "force"), Err(vec!["lbf".to_owned(), "kg".to_owned()]));
    assert_eq!(in_place("lb/in²", "pressure"), Err(vec!["lbf/in²".to_owned(), "kg".to_owned()]));
    assert_eq!(in_place("lb", "mass"), Ok(0.453_592_37));
    assert_eq!(in_place("K", "temperature"), Ok(1.0));
    assert_eq!(in_place("°C", "temperature"), Ok(274.15));
}

#[test]
fn a_tolerance_on_a_temperature_takes_degrees_as_a_difference() {
    let level = kind("temperature").map(|kind| layshaft_units::difference_of(&kind.ty()));
    let read = level.and_then(|wanted| parse_unit("°C").and_then(|unit| interpret_unit(&unit, &wanted)).ok());
    assert_eq!(read.map(|unit| unit.to_si(5.0)), Some(5.0));
}

#[test]
fn a_wrong_unit_has_its_likely_replacement() {
    for (unit, wanted, instead) in [
        ("J", "torque", "N·m"),
        ("N·m", "energy", "J"),
        ("Hz", "rotational_speed", "rev/s"),
        ("nm", "torque", "N·m"),
        ("kg·cm", "torque", "kgf·cm"),
        ("kg/cm²", "pressure", "kgf/cm²"),
        ("kg", "force", "kgf"),
        ("kgf·m²", "flywheel_effect", "kg·m²"),
        ("kg/cm", "torque", "kgf·cm"),
        ("°C", "temperature_difference", "K"),
        ("C", "temperature", "°C"),
        ("N·m", "torsional_stiffness", "N·m/rad"),
        ("V·s", "voltage_constant", "V·s/rad"),
    ] {
        let place = kind(wanted).map(|kind| kind.ty()).unwrap_or_else(|| panic!("{wanted}"));
        let found = parse_unit(unit).map(|unit| replacements(&unit, &place)).unwrap_or_default();
        assert!(found.iter().any(|(text, _)| text == instead), "{unit} for {wanted}: {found:?}");
    }
}

#[test]
fn bare_symbols_are_told_from_names() {
    for symbol in ["m", "min", "kW", "gal", "ton", "r", "in", "°C"] {
        assert!(unit_symbol(symbol), "{symbol}");
    }
    for name in ["motor", "x", "rated_load", "N·m", ""] {
        assert!(!unit_symbol(name), "{name}");
    }
}
