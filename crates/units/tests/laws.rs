//! Laws that hold for any unit, any type and any text.

use layshaft_units::{
    Angle, Function, KINDS, Tag, Type, add, apply, closest, compare, demand, divide, interpret_unit,
    multiply, negate, parse_unit, power, raise, replacements, root, subtract, unify, unit_rows, unit_symbol,
};
use proptest::prelude::*;

fn symbol() -> impl Strategy<Value = String> {
    let rows = unit_rows();
    let alone = |symbol: &str| !matches!(symbol, "barg" | "bara" | "psig" | "psia");
    let symbols: Vec<&str> = rows.iter().map(|row| row.symbol).filter(|symbol| alone(symbol)).collect();
    let prefixed = ["kW", "mm", "mΩ", "kN", "MPa", "μm", "kg", "hPa", "mAh", "GW", "daN", "ms"];
    prop_oneof![
        4 => proptest::sample::select(symbols).prop_map(str::to_owned),
        1 => proptest::sample::select(prefixed.to_vec()).prop_map(str::to_owned),
    ]
}

fn term() -> impl Strategy<Value = String> {
    (symbol(), prop_oneof![4 => Just(1), 1 => -3..=3_i32]).prop_map(|(symbol, power)| match power {
        0 | 1 => symbol,
        power => format!("{symbol}^{power}"),
    })
}

fn product() -> impl Strategy<Value = String> {
    proptest::collection::vec(term(), 1..4).prop_map(|terms| terms.join("*"))
}

/// Texts of units, nearly all of which can be read.
fn unit_text() -> impl Strategy<Value = String> {
    prop_oneof![
        product(),
        (product(), product()).prop_map(|(above, below)| format!("{above}/({below})")),
        (product(), term()).prop_map(|(above, below)| format!("{above}/{below}")),
        (product(), product()).prop_map(|(above, below)| format!("({above})*({below})^2")),
        product().prop_map(|below| format!("1/({below})")),
    ]
}

/// Text as a cat on the keyboard writes it, with all that a unit is made of.
fn soup() -> impl Strategy<Value = String> {
    prop_oneof![
        proptest::string::string_regex("[mNkgs1²³⁻^()/·*°%.Ωµ9 -]{0,24}")
            .unwrap_or_else(|error| panic!("{error}")),
        any::<String>(),
        unit_text(),
    ]
}

fn value_type() -> impl Strategy<Value = Type> {
    prop_oneof![
        4 => proptest::sample::select(KINDS).prop_map(|kind| kind.ty()),
        2 => unit_text().prop_filter_map("no unit", |text| parse_unit(&text).ok().map(|unit| unit.ty)),
        1 => prop_oneof![Just(0.0), Just(2.0)].prop_map(Type::of_number_literal),
        1 => Just(Type::pi()),
        2 => (proptest::sample::select(KINDS), proptest::sample::select(KINDS))
            .prop_filter_map("level", |(a, b)| multiply(&a.ty(), &b.ty()).ok()),
    ]
}

fn same_kind(a: &Type, b: &Type) -> bool {
    (a.dim, a.angle, a.tag, a.scale) == (b.dim, b.angle, b.tag, b.scale)
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(512))]

    #[test]
    fn no_text_panics(text in soup()) {
        let _ = unit_symbol(&text);
        match parse_unit(&text) {
            Ok(unit) => {
                prop_assert!(unit.factor.is_normal() && unit.factor > 0.0);
                for kind in KINDS {
                    let _ = interpret_unit(&unit, &kind.ty());
                    let _ = replacements(&unit, &kind.ty());
                }
                let _ = unit.ty.describe();
            }
            Err(error) => {
                let (start, end) = error.at();
                prop_assert!(start <= end && end <= text.len());
                prop_assert!(text.is_char_boundary(start) && text.is_char_boundary(end), "{error:?} in {text:?}");
                prop_assert!(!error.message().is_empty());
                let _ = error.hints();
            }
        }
    }

    #[test]
    fn the_canonical_spelling_is_the_same_unit(text in unit_text()) {
        if let Ok(unit) = parse_unit(&text) {
            prop_assert_eq!(parse_unit(&unit.text), Ok(unit));
        }
    }

    #[test]
    fn there_and_back_is_the_same_value(text in unit_text(), value in -1e6..1e6_f64) {
        if let Ok(unit) = parse_unit(&text) {
            let back = unit.from_si(unit.to_si(value));
            let size = value.abs() + unit.offset;
            prop_assert!((back - value).abs() <= 4.0 * f64::EPSILON * size, "{} {}: {}", value, unit.text, back);
        }
    }

    #[test]
    fn factors_multiply(a in product(), b in product()) {
        if let (Ok(x), Ok(y), Ok(both)) = (parse_unit(&a), parse_unit(&b), parse_unit(&format!("{a}*{b}")))
            && (x.factor * y.factor).is_normal()
        {
            let ratio = both.factor / (x.factor * y.factor);
            prop_assert!((ratio - 1.0).abs() < 4e-15, "{ratio}");
        }
    }

    #[test]
    fn a_quotient_undoes_a_product(a in value_type(), b in value_type()) {
        if let Ok(product) = multiply(&a, &b) {
            let back = divide(&product, &b);
            prop_assert!(back.is_ok());
            if let Ok(back) = back {
                prop_assert_eq!(back.dim, a.dim);
                // As open as before, and exactly the same where neither was open.
                match a.angle {
                    Angle::Free => prop_assert_eq!(back.angle, Angle::Free),
                    Angle::Range(low, high) => prop_assert!(back.angle.allows(low) && back.angle.allows(high)),
                }
                if let Angle::Range(low, high) = b.angle && low == high {
                    prop_assert_eq!(back.angle, a.angle);
                }
            }
        }
    }

    #[test]
    fn products_and_sums_do_not_depend_on_the_order(a in value_type(), b in value_type()) {
        prop_assert_eq!(multiply(&a, &b).is_ok(), multiply(&b, &a).is_ok());
        if let (Ok(x), Ok(y)) = (multiply(&a, &b), multiply(&b, &a)) {
            prop_assert_eq!(x, y);
        }
        for operation in [add, unify, compare] {
            match (operation(&a, &b), operation(&b, &a)) {
                (Ok(x), Ok(y)) => prop_assert_eq!(x, y),
                (Err(_), Err(_)) => {}
                (x, y) => prop_assert!(false, "{x:?} but {y:?}"),
            }
        }
        // A difference of level and difference has one order, and so has power less what is lost of it.
        let ordered = a.scale != b.scale || [a.tag, b.tag].contains(&Some(Tag::Heat));
        prop_assert!(ordered || subtract(&a, &b).is_ok() == subtract(&b, &a).is_ok());
    }

    #[test]
    fn a_value_agrees_with_itself(a in value_type()) {
        let met = unify(&a, &a);
        prop_assert!(met.is_ok_and(|met| same_kind(&met, &a)));
        prop_assert!(compare(&a, &a).is_ok());
        if let Ok(square) = power(&a, 2, 1) {
            let product = multiply(&a, &a);
            prop_assert!(product.is_ok_and(|product| same_kind(&product, &square)));
            let back = root(&square, 2);
            prop_assert!(back.is_ok_and(|back| back.dim == a.dim));
        }
    }

    #[test]
    fn no_operation_panics(a in value_type(), b in value_type(), num in any::<i32>(), den in any::<i32>(), x in any::<f64>()) {
        let _ = (power(&a, num, den), root(&a, den), negate(&a), raise(&a, &b, Some(x)), raise(&a, &b, None));
        for function in Function::all() {
            let _ = (apply(function, &[]), function.evaluate(&[]), function.evaluate(&[x]), function.evaluate(&[x, 1.0]));
            for refusal in [apply(function, &[a]), apply(function, &[a, b])].into_iter().filter_map(Result::err) {
                prop_assert!(!refusal.message().is_empty());
                let _ = refusal.hints();
            }
        }
        for kind in KINDS {
            if let Err(refusal) = demand(&a, kind) {
                prop_assert!(!refusal.message().is_empty());
                let _ = refusal.hints();
            }
        }
        for refusal in [add(&a, &b), subtract(&a, &b), unify(&a, &b)].into_iter().filter_map(Result::err) {
            prop_assert!(!refusal.message().is_empty());
            let _ = refusal.hints();
        }
    }

    #[test]
    fn a_near_word_is_one_of_the_words(word in "[a-z_]{0,12}", words in proptest::collection::vec("[a-z_]{0,12}", 0..6)) {
        match closest(&word, words.iter().map(String::as_str)) {
            Some(near) => prop_assert!(words.iter().any(|known| known == near)),
            None => prop_assert!(!words.contains(&word) || word.len() < 2),
        }
    }
}

#[test]
fn functions_have_values_where_they_are_defined_alone() {
    for (name, arguments, value) in [
        ("sqrt", vec![9.0], Some(3.0)),
        ("sqrt", vec![-1.0], None),
        ("cbrt", vec![-27.0], Some(-3.0)),
        ("ln", vec![0.0], None),
        ("ln", vec![1.0], Some(0.0)),
        ("log10", vec![1000.0], Some(3.0)),
        ("asin", vec![1.5], None),
        ("acos", vec![1.0], Some(0.0)),
        ("exp", vec![1000.0], None),
        ("atan2", vec![0.0, 0.0], None),
        ("atan2", vec![0.0, 1.0], Some(0.0)),
        ("min", vec![3.0, 1.0, 2.0], Some(1.0)),
        ("max", vec![3.0], None),
        ("abs", vec![-2.0], Some(2.0)),
        ("floor", vec![-0.5], Some(-1.0)),
        ("ceil", vec![0.2], Some(1.0)),
        ("round", vec![2.5], Some(3.0)),
        ("min", vec![f64::NAN, 1.0], None),
    ] {
        let function = Function::from_name(name);
        assert_eq!(
            function.and_then(|function| function.evaluate(&arguments)),
            value,
            "{name} {arguments:?}"
        );
        assert_eq!(function.map(Function::name), Some(name));
    }
    assert_eq!(Function::from_name("sinus"), None);
}
