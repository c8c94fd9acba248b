//! Spellings that two trades read differently: refused, with what to write for each reading.

use super::rows::Role;
use super::symbols::Symbol;
use super::tree::Level;
use crate::dimension::Dim;

type Choices = &'static [(&'static str, &'static str)];

const HORSEPOWER: Choices = &[
    ("hp", "horsepower of 550 ft·lbf/s, 745.6999 W"),
    ("PS", "metric horsepower of 75 kgf·m/s, 735.49875 W"),
];
const GALLON: Choices = &[("gal_us", "US gallon, 3.785 l"), ("gal_imp", "imperial gallon, 4.546 l")];
const TON: Choices = &[
    ("t", "tonne, 1000 kg"),
    ("short_ton", "US ton, 2000 lb = 907.185 kg"),
    ("long_ton", "imperial ton, 2240 lb = 1016.047 kg"),
];
const BTU: Choices = &[
    ("kJ", "an energy; 1 Btu is 1.05505585 kJ by the International Table"),
    ("kW", "a power; 1000 Btu/h is 0.293071 kW by the International Table"),
];
const CALORIE: Choices = &[
    ("J", "1 cal is 4.184 J (thermochemical) or 4.1868 J (International Table)"),
    ("kJ", "1 kcal is 4.184 kJ (thermochemical) or 4.1868 kJ (International Table)"),
];

const SYMBOLS: &[(&str, Choices)] = &[
    ("HP", HORSEPOWER),
    ("cv", HORSEPOWER),
    ("CV", HORSEPOWER),
    ("ch", HORSEPOWER),
    ("pk", HORSEPOWER),
    ("gal", GALLON),
    ("gpm", &[("gal_us/min", "US gallons per minute"), ("gal_imp/min", "imperial gallons per minute")]),
    ("gph", &[("gal_us/h", "US gallons per hour"), ("gal_imp/h", "imperial gallons per hour")]),
    ("ton", TON),
    ("tons", TON),
    ("kt", &[("kn", "knot, 1852 m/h"), ("t", "tonne; a kilotonne is 1000 t")]),
    ("Btu", BTU),
    ("BTU", BTU),
    ("btu", BTU),
    ("cal", CALORIE),
    ("kcal", CALORIE),
    ("mmHg", &[("mbar", "1 mmHg is 1.33322 mbar (conventional)"), ("mmH2O", "millimetre of water")]),
];

/// The choices if this one symbol is read differently in two trades.
pub(crate) fn symbol(text: &str) -> Option<Vec<(String, String)>> {
    let row = SYMBOLS.iter().find(|row| row.0 == text)?;
    Some(row.1.iter().map(|(unit, meaning)| ((*unit).to_owned(), (*meaning).to_owned())).collect())
}

/// Every symbol refused with choices.
pub(crate) fn symbols() -> impl Iterator<Item = &'static str> {
    SYMBOLS.iter().map(|row| row.0)
}

/// The choices if the product is a pound or an ounce times a foot or an inch, as in `ft·lb`: written for a
/// torque nearly always, although pound and ounce are masses. With seconds below it may be a mass after all
/// (`lb·ft/s²`).
pub(crate) fn product(level: &Level, parts: &[(Symbol, i32)], dim: Dim) -> Option<Vec<(String, String)>> {
    let pound = parts.iter().find(|(s, power)| *power == 1 && matches!(s.row.symbol, "lb" | "oz"))?;
    let length: i32 =
        parts.iter().map(|(s, power)| if let Role::Length(n) = s.row.role { n * power } else { 0 }).sum();
    let imperial = parts.iter().any(|(s, _)| matches!(s.row.symbol, "ft" | "in"));
    let forces = parts.iter().any(|(s, _)| s.row.role == Role::Force);
    if length != 1 || !imperial || forces || dim.0[2] < 0 {
        return None;
    }
    let as_force = level.text_with(&with_force);
    let ounce = pound.0.row.symbol == "oz";
    let mut choices = vec![(
        as_force,
        if ounce { "the ounce as a force" } else { "the pound as a force: a torque, or per torque" }
            .to_owned(),
    )];
    if parts.len() == 2 {
        choices.push(match (ounce, parts.iter().any(|(s, _)| s.row.symbol == "ft")) {
            (true, _) => {
                ("g·mm".to_owned(), "an unbalance, mass times radius; 1 oz·in is 720.078 g·mm".to_owned())
            }
            (false, true) => ("J".to_owned(), "an energy; 1 foot-pound is 1.35582 J".to_owned()),
            (false, false) => ("J".to_owned(), "an energy; 1 inch-pound is 0.112985 J".to_owned()),
        });
    } else {
        choices
            .push((level.text_with(&in_kilograms), "the pound or ounce as a mass, in kilograms".to_owned()));
    }
    Some(choices)
}

/// The symbol with a unit of mass turned into the force of that name.
pub(crate) fn with_force(symbol: &Symbol) -> String {
    let text = symbol.text();
    match text.as_str() {
        "kg" => "kgf".to_owned(),
        "g" => "gf".to_owned(),
        "t" => "tf".to_owned(),
        "lb" => "lbf".to_owned(),
        "oz" => "ozf".to_owned(),
        _ => text,
    }
}

/// The symbol with a unit of force turned into the mass of that name.
pub(crate) fn with_mass(symbol: &Symbol) -> String {
    let text = symbol.text();
    match text.as_str() {
        "kgf" => "kg".to_owned(),
        "gf" => "g".to_owned(),
        "tf" => "t".to_owned(),
        "lbf" => "lb".to_owned(),
        "ozf" => "oz".to_owned(),
        _ => text,
    }
}

fn in_kilograms(symbol: &Symbol) -> String {
    match symbol.row.symbol {
        "lb" | "oz" => "kg".to_owned(),
        _ => symbol.text(),
    }
}
