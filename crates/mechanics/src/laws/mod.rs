//! The laws, one file each: formula, symbols with units, validity, source, revision, and the kernel that computes it.
//!
//! A kind (see `kinds`) puts laws together; a law knows no fields and no messages.

use crate::registry::Formula;

pub mod affinity;
pub mod air_motor;
pub mod battery;
pub mod belt;
pub mod bounded_power;
pub mod brake;
pub mod capstan;
pub mod clutch;
pub mod conveyor;
pub mod crank;
pub mod cutting;
pub mod dc_envelope;
pub mod dc_machine;
pub mod drag;
pub mod engine;
pub mod fluid_coupling;
pub mod gear;
pub mod generator;
pub mod hydraulic_motor;
pub mod incline;
pub mod induction_circuit;
pub mod induction_curve;
pub mod inertia;
pub mod inverter_envelope;
pub mod kloss;
pub mod off_axis;
pub mod person_power;
pub mod planetary;
pub mod power_law;
pub mod rack;
pub mod road;
pub mod rope;
pub mod scaled_table;
pub mod screw;
pub mod series_machine;
pub mod servo_envelope;
pub mod shaft;
pub mod straight_line;
pub mod synchronous;
pub mod table;
pub mod torque_polynomial;
pub mod turbo;
pub mod universal_joint;
pub mod wheel;
pub mod wind_rotor;
pub mod winder;
pub mod winding;
pub mod work_stroke;
pub mod worm;

#[cfg(test)]
pub(crate) mod testing;

/// Standard gravity, m/s² (3rd CGPM, 1901; ISO 80000-3).
pub const G_N: f64 = 9.806_65;

/// A formula as it is printed, and the kernel that must equal it for every input of a box.
#[derive(Debug)]
pub struct Checked {
    /// The formula.
    pub formula: &'static Formula,
    /// Lowest and highest value of each symbol, in the order of `formula.symbols`.
    pub domain: &'static [(f64, f64)],
    /// The kernel; takes the symbols in that order, in SI.
    pub kernel: fn(&[f64]) -> f64,
}

/// Every formula with its kernel.
pub fn checked() -> impl Iterator<Item = &'static Checked> {
    let laws: &[&'static [Checked]] = &[
        affinity::CHECKED,
        air_motor::CHECKED,
        battery::CHECKED,
        belt::CHECKED,
        bounded_power::CHECKED,
        brake::CHECKED,
        capstan::CHECKED,
        clutch::CHECKED,
        conveyor::CHECKED,
        crank::CHECKED,
        cutting::CHECKED,
        dc_envelope::CHECKED,
        dc_machine::CHECKED,
        drag::CHECKED,
        engine::CHECKED,
        fluid_coupling::CHECKED,
        gear::CHECKED,
        generator::CHECKED,
        hydraulic_motor::CHECKED,
        incline::CHECKED,
        induction_circuit::CHECKED,
        induction_curve::CHECKED,
        inertia::CHECKED,
        inverter_envelope::CHECKED,
        kloss::CHECKED,
        off_axis::CHECKED,
        person_power::CHECKED,
        planetary::CHECKED,
        power_law::CHECKED,
        rack::CHECKED,
        road::CHECKED,
        rope::CHECKED,
        scaled_table::CHECKED,
        screw::CHECKED,
        series_machine::CHECKED,
        servo_envelope::CHECKED,
        shaft::CHECKED,
        straight_line::CHECKED,
        synchronous::CHECKED,
        table::CHECKED,
        torque_polynomial::CHECKED,
        turbo::CHECKED,
        universal_joint::CHECKED,
        wheel::CHECKED,
        wind_rotor::CHECKED,
        winder::CHECKED,
        winding::CHECKED,
        work_stroke::CHECKED,
        worm::CHECKED,
    ];
    laws.iter().copied().flatten()
}

#[cfg(test)]
mod tests {
    use super::{Checked, checked};

    /// Words of the expression grammar that a formula may use beside its symbols.
    const FUNCTIONS: &[&str] = &["pi", "sqrt", "abs", "min", "max", "sin", "cos", "tan", "atan", "exp", "ln"];

    /// The names in a formula; a word directly after a number is a unit.
    fn names(text: &str) -> Vec<String> {
        let mut out = Vec::new();
        let mut chars = text.chars().peekable();
        let mut after_number = false;
        while let Some(c) = chars.next() {
            if c.is_alphabetic() || c == '_' {
                let mut word = String::from(c);
                let unit = after_number;
                let more = |c: char| c.is_alphanumeric() || c == '_' || (unit && "·/²³^".contains(c));
                while let Some(next) = chars.next_if(|c| more(*c)) {
                    word.push(next);
                }
                if !unit {
                    out.push(word);
                }
                after_number = false;
            } else if c.is_ascii_digit() || c == '.' {
                after_number = true;
            } else if c != ' ' {
                after_number = false;
            }
        }
        out
    }

    #[test]
    fn formulas_name_their_symbols_and_no_others() {
        for Checked { formula, domain, .. } in checked() {
            let declared: Vec<&str> = formula.symbols.iter().map(|(name, _, _)| *name).collect();
            let used = names(formula.text);
            for name in &used {
                let known = declared.contains(&name.as_str()) || FUNCTIONS.contains(&name.as_str());
                assert!(known, "{}: `{}` names {name}, which is not declared", formula.name, formula.text);
            }
            for name in &declared {
                assert!(used.iter().any(|word| word == name), "{}: {name} is not used", formula.text);
            }
            assert_eq!(declared.len(), domain.len(), "{}", formula.text);
            assert!(domain.iter().all(|(low, high)| low <= high), "{}", formula.text);
        }
    }

    #[test]
    fn names_are_told_from_units() {
        assert_eq!(names("m * (9.80665 m/s²) * sin(a_1) - 235 K"), ["m", "sin", "a_1"]);
    }

    #[test]
    fn kernels_answer_in_their_domain() {
        for Checked { formula, domain, kernel } in checked() {
            for share in [0.0, 0.3, 0.7, 1.0] {
                let x: Vec<f64> = domain.iter().map(|(low, high)| low + share * (high - low)).collect();
                assert!(kernel(&x).is_finite(), "{} at {x:?}", formula.text);
            }
        }
    }

    #[test]
    fn every_formula_says_where_it_holds_and_where_it_comes_from() {
        for Checked { formula, .. } in checked() {
            for text in [formula.name, formula.text, formula.validity, formula.source] {
                assert!(!text.is_empty() && !text.ends_with('.'), "{text}");
            }
            assert!(formula.revision >= 1);
        }
    }
}
