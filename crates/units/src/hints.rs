//! What to write instead of what the algebra refuses.

use crate::dimension::{Dim, WHOLE};
use crate::function::Function;
use crate::kind::Kind;
use crate::quantity::{Scale, Tag, Type};
use crate::refusal::{Operation, Refusal, missing_radians};

const FORCE: Dim = Dim::whole(1, 1, -2, 0, 0);
const MASS: Dim = Dim::whole(0, 1, 0, 0, 0);
const ACCELERATION: Dim = Dim::whole(1, 0, -2, 0, 0);
const PER_TIME: Dim = Dim::whole(0, 0, -1, 0, 0);

pub(crate) fn hints(refusal: &Refusal) -> Vec<String> {
    match refusal {
        Refusal::WrongDimension { wanted, found } => wrong_dimension(wanted, found),
        Refusal::WrongKind { wanted, found } => wrong_kind(wanted, found),
        Refusal::WrongTag { wanted, found } => wrong_tag(wanted, *found),
        Refusal::WrongScale { wanted, .. } => wrong_scale(wanted),
        Refusal::DifferentDimensions { left, right, .. } => different_dimensions(left, right),
        Refusal::DifferentKinds { left, right, .. } => different_kinds(left, right),
        Refusal::DifferentTags { left, right, .. } => different_tags(*left, *right),
        Refusal::LevelScaled { operation } => level_scaled(*operation),
        Refusal::LevelsAdded => one("add a temperature difference, in kelvin: `ambient + 40 K`"),
        Refusal::LevelTaken => one("turn it round: temperature − difference, or temperature − temperature"),
        Refusal::LevelBesideDifference { .. } => one(
            "take a difference first: `winding - ambient <= 80 K`; a literal such as `313 K` may be either",
        ),
        Refusal::WantsAngle { found, .. } => wants_angle(found),
        Refusal::WantsNumber { function, found } => wants_number(*function, found),
        Refusal::ExponentNotNumber { .. } | Refusal::ExponentNotConstant { .. } => {
            one("divide the base by its unit first, so that it is a plain number: `(x / (1 m)) ^ n`")
        }
        Refusal::PowerOfUnit { .. } => {
            one("divide the base by its unit first, so that it is a plain number: `(x / (1 m)) ^ 0.37`")
        }
        Refusal::Arguments { .. } | Refusal::ExponentTooLarge => Vec::new(),
    }
}

fn one(text: &str) -> Vec<String> {
    vec![text.to_owned()]
}

fn wrong_dimension(wanted: &Kind, found: &Type) -> Vec<String> {
    if found.is_plain_number() && !wanted.unit.is_empty() {
        return vec![format!("give it a unit: {}", offered(wanted))];
    }
    if wanted.dim == FORCE && found.dim == MASS {
        return vec![
            "for the weight of the mass, multiply by the acceleration of free fall: `m * 9.80665 m/s²`"
                .to_owned(),
            "for a force given in kilograms, write `kgf` (1 kgf = 9.80665 N)".to_owned(),
        ];
    }
    if wanted.dim == MASS && found.dim == FORCE {
        return vec![
            "for the mass that weighs so much, divide by the acceleration of free fall: `F / (9.80665 m/s²)`"
                .to_owned(),
            "for a mass given in kilograms, write `kg`, not `kgf`".to_owned(),
        ];
    }
    if wanted.dim.minus(found.dim) == Some(ACCELERATION) {
        let weight =
            format!("for the weight, multiply by 9.80665 m/s²: then it is {}", wanted.with_article());
        return vec!["if the kilogram or the pound is a force here, write `kgf` or `lbf`".to_owned(), weight];
    }
    if found.dim.minus(wanted.dim) == Some(ACCELERATION) {
        let as_mass = "if the force unit is meant as a mass, write `kg` or `lb`, not `kgf` or `lbf`";
        if wanted.name == "moment_of_inertia" {
            let effect = "a flywheel effect GD² is `let GD2: flywheel_effect = … kg·m²`, and J = GD²/4";
            return vec![as_mass.to_owned(), effect.to_owned()];
        }
        return one(as_mass);
    }
    specific(wanted, found).map_or_else(|| fallback(wanted), one)
}

/// Slips that have a name of their own.
fn specific(wanted: &Kind, found: &Type) -> Option<&'static str> {
    const SLIPS: &[(&str, Dim, &str)] = &[
        ("torque", Dim::whole(1, 0, 0, 0, 0), "`nm` is the nanometre; the newton metre is `N·m`"),
        ("torque", Dim::whole(2, 1, -3, 0, 0), "a torque is power over rotational speed: `P / n`"),
        ("torque", FORCE, "a torque is force times radius: `F * r`"),
        ("torque", Dim::whole(-1, 1, 0, 0, 0), "if kgf·cm is meant, write it with `kgf` and `·`"),
        (
            "power",
            Dim::whole(2, 1, -2, 0, 0),
            "a power is torque times rotational speed, or energy over time",
        ),
        ("force", Dim::whole(2, 1, -2, 0, 0), "a force is torque over radius: `T / r`"),
        ("temperature", Dim::whole(0, 0, 1, 1, 0), "`C` is the coulomb; degrees Celsius are `°C` or `degC`"),
        (
            "temperature",
            Dim::whole(-2, -1, 4, 2, 0),
            "`F` is the farad; degrees Fahrenheit are `°F` or `degF`",
        ),
        ("rotational_speed", Dim::whole(1, 0, -1, 0, 0), "a rotational speed is speed over radius: `v / r`"),
        ("rotational_speed", Dim::whole(0, 0, 1, 0, 0), "a rotational speed is angle over time: `1 rev / t`"),
        ("speed", Dim::whole(0, 0, -1, 0, 0), "a speed is rotational speed times radius: `n * r`"),
        ("time", Dim::whole(-2, -1, 3, 2, 0), "`S` is the siemens; the second is `s`"),
        ("acceleration", MASS, "`g` is the gram; the acceleration of free fall is `9.80665 m/s²` or `1 g_n`"),
    ];
    SLIPS.iter().find(|(name, dim, _)| *name == wanted.name && *dim == found.dim).map(|row| row.2)
}

fn fallback(wanted: &Kind) -> Vec<String> {
    if wanted.unit.is_empty() {
        return one("divide by a value of the same kind, or by one unit of it, to get a plain number");
    }
    vec![format!("units of {}: {}", wanted.with_article(), offered(wanted))]
}

fn offered(kind: &Kind) -> String {
    let units: Vec<String> =
        kind.units.iter().filter(|u| !u.is_empty()).take(5).map(|u| format!("`{u}`")).collect();
    units.join(", ")
}

fn wrong_kind(wanted: &Kind, found: &Type) -> Vec<String> {
    let name = found.candidates().first().map(|kind| kind.name);
    let text = match (wanted.name, name) {
        ("torque", Some("energy")) => "a torque is written in `N·m`, an energy in `J`",
        ("energy", Some("torque")) => {
            "an energy is written in `J`; torque times the angle turned is an energy"
        }
        ("rotational_speed", Some("frequency")) => {
            "a frequency counts cycles: for turns write `rpm` or `rev/s`, or multiply by a turn: `f * 1 rev`"
        }
        ("frequency" | "rate", Some("rotational_speed")) => {
            "a rotational speed counts radians: for turns per time divide by a turn: `n / (1 rev)`"
        }
        ("angle" | "slope", Some("number" | "grade")) => {
            "an angle is written in `°` or `rad`; the angle of a grade is `atan(grade)`"
        }
        ("grade", Some("angle")) => "a grade is rise per run: `tan(angle)`, or a number in `%`",
        ("number" | "percentage" | "count", Some("angle")) => {
            "for the number of turns divide by a turn: `x / (1 rev)`"
        }
        ("torsional_stiffness", Some("torque")) => {
            "a torsional stiffness is torque per angle: `N·m/rad`, `N·m/°`"
        }
        ("angular_acceleration", _) => "an angular acceleration counts radians: `rad/s²`, `rpm/s`",
        ("quadratic_torque_coefficient" | "cubic_power_coefficient", Some("moment_of_inertia")) => {
            "the coefficient is per square or cube of the speed: `N·m/rpm²`, `W/rpm³`"
        }
        _ => "",
    };
    let mut out: Vec<String> = if text.is_empty() { Vec::new() } else { one(text) };
    out.extend(escape(wanted, found));
    if out.is_empty() { fallback(wanted) } else { out }
}

/// The way out where a frequency was taken for a rotational speed, or where the formula is right but its radians
/// are counted otherwise: `m * v * w` is a force.
fn escape(wanted: &Kind, found: &Type) -> Option<String> {
    let missing = missing_radians(wanted, found)?;
    let cycles = found.turns.frequency;
    if missing != 0 && cycles == missing * WHOLE && found.dim != PER_TIME {
        return Some(
            "a frequency counts cycles: write `2 * pi * f` for it, or take the rotational speed".to_owned(),
        );
    }
    // Only a rotational speed brings radians that a formula may not mean.
    if !found.turns.rotates || found.literal || cycles != 0 || found.dim == PER_TIME {
        return None;
    }
    let factor = match missing {
        0 => return None,
        1 => "* (1 rad)".to_owned(),
        -1 => "/ (1 rad)".to_owned(),
        more if more > 0 => format!("* (1 rad)^{more}"),
        fewer => format!("/ (1 rad)^{}", fewer.unsigned_abs()),
    };
    Some(format!("if the formula is right and only its radians are counted otherwise, write `(…) {factor}`"))
}

fn wrong_tag(wanted: &Kind, found: Tag) -> Vec<String> {
    let text = match (wanted.tag, found) {
        (Some(Tag::FlywheelEffect), Tag::Inertia) => "GD² = 4·J: write `4 * J`",
        (_, Tag::FlywheelEffect) => "J = GD²/4: write `GD2 / 4`",
        (Some(Tag::Mechanical), Tag::Electrical) => "multiply the electrical power by the efficiency",
        (Some(Tag::Electrical), Tag::Mechanical) => "divide the mechanical power by the efficiency",
        (_, Tag::Heat) => "heat is electrical less mechanical power; subtract it from what goes in",
        (Some(Tag::Absolute), Tag::Gauge) => {
            "absolute = gauge + ambient pressure, about 1.013 bar at sea level"
        }
        (Some(Tag::Gauge), Tag::Absolute) => {
            "gauge = absolute − ambient pressure, about 1.013 bar at sea level"
        }
        (None, Tag::Gauge | Tag::Absolute) => {
            "a pressure here is a difference: subtract the pressure on the other side"
        }
        (_, Tag::Grade) => "a grade is rise per run; its angle is `atan(grade)`, its number `grade * 1`",
        _ => return Vec::new(),
    };
    one(text)
}

fn wrong_scale(wanted: &Kind) -> Vec<String> {
    if wanted.scale == Scale::Level {
        return one("a difference is no temperature: add it to one, `ambient + rise`");
    }
    one(
        "a difference of temperatures is written in `K`, or is temperature − temperature; a rise of 80 °C is `80 K`",
    )
}

fn different_dimensions(left: &Type, right: &Type) -> Vec<String> {
    let number = left.is_plain_number() || right.is_plain_number();
    let weight = [(left, right), (right, left)].iter().any(|(a, b)| a.dim == FORCE && b.dim == MASS);
    match (number, weight) {
        (true, _) => one("give the plain number a unit, or divide the other value by one"),
        (_, true) => one("for the weight of a mass write `m * 9.80665 m/s²`, or its unit as `kgf`"),
        _ => [(left, right), (right, left)]
            .iter()
            .find_map(|(a, b)| a.candidates().iter().find_map(|kind| specific(kind, b)))
            .map_or_else(Vec::new, one),
    }
}

fn different_kinds(left: &Type, right: &Type) -> Vec<String> {
    let kinds: Vec<&'static Kind> = left.candidates().into_iter().take(1).collect();
    kinds.first().map_or_else(Vec::new, |kind| wrong_kind(kind, right))
}

fn different_tags(left: Tag, right: Tag) -> Vec<String> {
    let text = match (left.min(right), left.max(right)) {
        (Tag::Mechanical, Tag::Electrical) => {
            "bring both to one side of the machine with the efficiency; electrical − mechanical is the heat"
        }
        (Tag::Inertia, Tag::FlywheelEffect) => "GD² = 4·J: write `GD2 / 4` for the inertia, or `4 * J`",
        (Tag::Gauge, Tag::Absolute) => {
            "absolute = gauge + ambient pressure: bring one to the other first, `1 * p_gauge + 1.013 bar`"
        }
        _ => return Vec::new(),
    };
    one(text)
}

fn level_scaled(operation: Operation) -> Vec<String> {
    match operation {
        Operation::Negate => one("write the sign with the number: `-20 °C`"),
        Operation::Multiply | Operation::Divide => one(
            "use a difference: `0.39 %/K * (winding - 20 °C)`; as a factor above absolute zero write `t - (-273.15 °C)`",
        ),
        _ => one("use a difference of temperatures"),
    }
}

fn wants_angle(found: &Type) -> Vec<String> {
    if found.tag == Some(Tag::Grade) {
        return one("the angle of a grade is `atan(grade)`: `sin(atan(grade))`");
    }
    if found.is_plain_number() {
        return one(
            "say which unit of angle is meant, `°` or `rad`, as in `sin(x * 1 rad)`; the angle of a grade is `atan(grade)`",
        );
    }
    Vec::new()
}

fn wants_number(function: Function, found: &Type) -> Vec<String> {
    match function {
        Function::Floor | Function::Ceil | Function::Round => {
            one("round a count of units: `ceil(x / (1 mm)) * 1 mm`")
        }
        Function::Asin | Function::Acos if found.tag == Some(Tag::Grade) => {
            one("a grade is rise per run, a tangent: `atan(grade)`")
        }
        Function::Ln | Function::Log10 => one("divide by a value of the same kind: `ln(x / x0)`"),
        _ => one("divide by a value of the same kind first"),
    }
}
