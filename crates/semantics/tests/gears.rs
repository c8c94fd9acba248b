//! Gears and layers of rope: what stands open is solved in each, what is named is taken.

mod common;

use common::{analysis, check};
use layshaft_semantics::Analysis;

const CART: &str = "
source motor: straight_line { stall_torque = 12 N·m; no_load_speed = 3000 rpm; braking = as_generator }
transmission box: gearbox {
    gear 1 = reduction 12
    gear high = 20 drives 80
    gear n = neutral
    efficiency = 94 %
    efficiency high = 90 %
    efficiency_backward = 92 %
}
transmission rear: wheel { rolling_circumference = 1.1 m }
load cart: vehicle { mass = 120 kg; rolling_resistance = 0.015; drag_area = 1.1 m²; air_density = 1.2 kg/m³; grade = 1 % }
drive haul = motor -> box -> rear -> cart { direction = forward }
";

const WINCH: &str = "
source motor: straight_line { stall_torque = 12 N·m; no_load_speed = 3000 rpm; braking = as_generator }
transmission holding_brake: brake { torque = 15 N·m; apply_time = 50 ms }
transmission winch: drum {
    pitch_diameter = 90 mm; rope_diameter = 8 mm; layers = 3
    efficiency = 95 %; efficiency_backward = 95 %
}
load bucket: hoist { mass = 12 kg }
drive well = motor -> holding_brake -> winch -> bucket { direction = forward }
";

/// The SI values of the first `show`, by the label of their case and gear.
fn shown(analysis: &Analysis) -> Vec<(String, Option<f64>)> {
    let outcomes = &analysis.shows[0].outcomes;
    let label = |case: usize, gear: &Option<String>| {
        let case = &analysis.cases[case].label;
        gear.as_ref().map_or_else(|| case.clone(), |gear| format!("{case}, gear {gear}"))
    };
    let value = |datum: &layshaft_semantics::quantity::Datum| match datum {
        layshaft_semantics::quantity::Datum::Quantity(found) => Some(found.si),
        _ => None,
    };
    outcomes.iter().map(|o| (label(o.case, &o.gear), o.value.as_ref().and_then(value))).collect()
}

#[test]
fn open_gears_are_solved_in_each_but_neutral() {
    check(CART);
    let found = shown(&analysis(&format!("{CART}show haul.box.efficiency as %\n")));
    let near = |wanted: f64| move |value: f64| (value - wanted).abs() < 1e-12;
    assert_eq!(found.len(), 2, "{found:?}");
    assert!(found[0].0 == "plain, gear 1" && found[0].1.is_some_and(near(0.94)), "{found:?}");
    assert!(found[1].0 == "plain, gear high" && found[1].1.is_some_and(near(0.90)), "{found:?}");
}

#[test]
fn neutral_is_engaged_where_it_is_named() {
    let text = format!(
        "{CART}case parked {{ haul.gear = n; cart.grade = 6 % }}\nshow haul.motor.torque  only in parked\n"
    );
    let found = shown(&analysis(&text));
    assert_eq!(found, [("parked".to_owned(), Some(0.0))]);
}

#[test]
fn a_loss_of_a_gear_that_is_not_there() {
    check(&CART.replace(
        "    efficiency high = 90 %\n",
        "    efficiency low = 90 %  #! unknown-name: no gear of this gearbox is called `low`\n",
    ));
    check(
        "source m: straight_line { stall_torque 1 = 5 N·m; stall_torque = 5 N·m; no_load_speed = 3000 rpm }  #! unknown-field",
    );
}

#[test]
fn open_layers_are_judged_at_both_ends() {
    let show = "show well.speed as m/min\n";
    let found = shown(&analysis(&format!("{WINCH}{show}")));
    let labels: Vec<&str> = found.iter().map(|(label, _)| label.as_str()).collect();
    assert_eq!(labels, ["plain", "plain, layer 1"]);
    let named = |layer: u32| {
        let text = WINCH.replace("layers = 3", &format!("layers = 3; layer = {layer}"));
        shown(&analysis(&format!("{text}{show}")))
    };
    assert_eq!(named(3), [("plain".to_owned(), found[0].1)]);
    assert_eq!(named(1), [("plain".to_owned(), found[1].1)]);
    // One layer leaves nothing open.
    let one = WINCH.replace("layers = 3", "layers = 1");
    assert_eq!(shown(&analysis(&format!("{one}{show}"))).len(), 1);
}

#[test]
fn a_criterion_is_judged_on_the_worse_layer() {
    let text = format!(
        "{WINCH}require \"1\" well.motor.speed <= 1700 rpm\nrequire \"2\" well.motor.torque <= 7 N·m\n"
    );
    let analysis = analysis(&text);
    let governing = |index: usize| {
        let criterion = &analysis.criteria[index];
        let worst = criterion.governing.and_then(|at| criterion.outcomes.get(at));
        worst.map(|outcome| analysis.cases[outcome.case].label.clone())
    };
    assert_eq!(governing(0).as_deref(), Some("plain, layer 1"));
    assert_eq!(governing(1).as_deref(), Some("plain"));
}
