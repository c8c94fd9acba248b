//! The unit a number of a kind is usually shown in, with the prefix that suits its size.

use layshaft_units::{kind, parse_unit};

/// Units of one kind by size: from which value (in the unit itself) each is used, largest unit first.
type Family = &'static [(&'static str, f64)];

const TORQUES: Family = &[("kN·m", 10.0), ("N·m", 0.1), ("mN·m", 0.0)];
const FORCES: Family = &[("kN", 10.0), ("N", 0.0)];
const POWERS: Family = &[("MW", 10.0), ("kW", 1.0), ("W", 0.0)];
const HEATS: Family = &[("kW", 10.0), ("W", 0.0)];
const ENERGIES: Family = &[("MJ", 10.0), ("kJ", 10.0), ("J", 0.0)];
const LENGTHS: Family = &[("m", 1.0), ("mm", 0.0)];
const MASSES: Family = &[("t", 10.0), ("kg", 0.1), ("g", 0.0)];
const INERTIAS: Family = &[("kg·m²", 0.001), ("kg·cm²", 0.01), ("g·cm²", 0.0)];
const TIMES: Family = &[("s", 0.1), ("ms", 0.0)];
const CURRENTS: Family = &[("kA", 10.0), ("A", 0.1), ("mA", 0.0)];
const VOLTAGES: Family = &[("kV", 10.0), ("V", 0.1), ("mV", 0.0)];
const RESISTANCES: Family = &[("kΩ", 10.0), ("Ω", 1.0), ("mΩ", 0.0)];

fn family(kind: &str) -> Option<Family> {
    Some(match kind {
        "torque" => TORQUES,
        "force" => FORCES,
        "power" | "mechanical_power" | "electrical_power" => POWERS,
        "heat" => HEATS,
        "energy" => ENERGIES,
        "length" => LENGTHS,
        "mass" => MASSES,
        "moment_of_inertia" => INERTIAS,
        "time" => TIMES,
        "current" => CURRENTS,
        "voltage" => VOLTAGES,
        "resistance" => RESISTANCES,
        _ => return None,
    })
}

/// The usual unit of a kind with the prefix that suits the largest of these SI values.
#[must_use]
pub fn usual_unit(name: &str, values: impl IntoIterator<Item = f64>) -> String {
    let Some(known) = kind(name) else { return String::new() };
    let largest = values.into_iter().map(f64::abs).filter(|v| v.is_finite()).fold(0.0, f64::max);
    match family(name) {
        Some(family) if largest > 0.0 => {
            let fits = |(unit, from): &&(&str, f64)| convert(largest, unit).abs() >= *from;
            family.iter().find(fits).map_or(known.unit, |(unit, _)| unit).to_string()
        }
        _ if matches!(name, "percentage" | "grade") => String::from("%"),
        _ => known.unit.to_string(),
    }
}

/// An SI value in a unit; unchanged in a unit that nobody knows.
#[must_use]
pub fn convert(si: f64, unit: &str) -> f64 {
    if unit.is_empty() {
        return si;
    }
    parse_unit(unit).map_or(si, |unit| unit.from_si(si))
}

#[cfg(test)]
mod tests {
    use super::*;
    use layshaft_units::KINDS;

    #[test]
    fn the_prefix_suits_the_size() {
        let cases: &[(&str, f64, &str)] = &[
            ("torque", 23.55, "N·m"),
            ("torque", 12_500.0, "kN·m"),
            ("torque", 0.02, "mN·m"),
            ("power", 3570.0, "kW"),
            ("power", 90.0, "W"),
            ("power", 25.0e6, "MW"),
            ("length", 0.0247, "mm"),
            ("time", 0.03, "ms"),
            ("rotational_speed", 150.0, "rpm"),
            ("speed", 0.25, "m/s"),
            ("resistance", 0.11, "mΩ"),
            ("power", 0.0, "kW"),
            ("percentage", 0.5, "%"),
            ("number", 2.0, ""),
            ("no_such_kind", 2.0, ""),
        ];
        for (kind, si, unit) in cases {
            assert_eq!(usual_unit(kind, [*si]), *unit, "{kind} {si}");
        }
    }

    #[test]
    fn every_family_is_of_its_kind_and_sorted() {
        for kind in KINDS {
            let Some(family) = family(kind.name) else { continue };
            for pair in family.windows(2) {
                assert!(convert(1.0, pair[0].0) < convert(1.0, pair[1].0), "{}", kind.name);
            }
            assert_eq!(family.last().map(|last| last.1), Some(0.0), "{}", kind.name);
            assert!(family.iter().any(|(unit, _)| *unit == kind.unit), "{}: {}", kind.name, kind.unit);
        }
    }
}
