//! Every row of the unit table that the `uom` library also has, against its factor. `uom` rounds the imperial
//! factors in the seventh digit, hence the tolerance; our own are exact.

use layshaft_units::parse_unit;
use uom::si::f64::*;

/// Largest relative difference.
const TOLERANCE: f64 = 2.0e-7;

/// Rows that `uom` rounds more coarsely still: 1.638706e-5 for 1.638 706 4e-5, 14.5939 for 14.593 903.
const COARSER: &[(&str, f64)] = &[("in³", 2.5e-7), ("slug", 2.1e-7)];

macro_rules! rows {
    ($($text:literal => $quantity:ident, $module:ident::$unit:ident;)*) => {
        vec![$(($text, $quantity::new::<uom::si::$module::$unit>(1.0).value)),*]
    };
}

fn space_and_time() -> Vec<(&'static str, f64)> {
    rows! {
        "m" => Length, length::meter;
        "mm" => Length, length::millimeter;
        "μm" => Length, length::micrometer;
        "km" => Length, length::kilometer;
        "in" => Length, length::inch;
        "ft" => Length, length::foot;
        "yd" => Length, length::yard;
        "mi" => Length, length::mile;
        "nmi" => Length, length::nautical_mile;
        "mil" => Length, length::mil;
        "ha" => Area, area::hectare;
        "cm²" => Area, area::square_centimeter;
        "in²" => Area, area::square_inch;
        "l" => Volume, volume::liter;
        "cm³" => Volume, volume::cubic_centimeter;
        "in³" => Volume, volume::cubic_inch;
        "ft³" => Volume, volume::cubic_foot;
        "gal_us" => Volume, volume::gallon;
        "gal_imp" => Volume, volume::gallon_imperial;
        "s" => Time, time::second;
        "ms" => Time, time::millisecond;
        "min" => Time, time::minute;
        "h" => Time, time::hour;
        "d" => Time, time::day;
        "rad" => Angle, angle::radian;
        "°" => Angle, angle::degree;
        "rev" => Angle, angle::revolution;
        "Hz" => Frequency, frequency::hertz;
        "kHz" => Frequency, frequency::kilohertz;
        "rpm" => AngularVelocity, angular_velocity::revolution_per_minute;
        "rps" => AngularVelocity, angular_velocity::revolution_per_second;
        "°/s" => AngularVelocity, angular_velocity::degree_per_second;
        "rad/s²" => AngularAcceleration, angular_acceleration::radian_per_second_squared;
        "m/s" => Velocity, velocity::meter_per_second;
        "km/h" => Velocity, velocity::kilometer_per_hour;
        "mph" => Velocity, velocity::mile_per_hour;
        "kn" => Velocity, velocity::knot;
        "ft/s" => Velocity, velocity::foot_per_second;
        "m/s²" => Acceleration, acceleration::meter_per_second_squared;
        "g_n" => Acceleration, acceleration::standard_gravity;
        "ft/s²" => Acceleration, acceleration::foot_per_second_squared;
        "l/min" => VolumeRate, volume_rate::liter_per_minute;
        "m³/h" => VolumeRate, volume_rate::cubic_meter_per_hour;
        "cfm" => VolumeRate, volume_rate::cubic_foot_per_minute;
        "gal_us/min" => VolumeRate, volume_rate::gallon_per_minute;
    }
}

fn mechanics() -> Vec<(&'static str, f64)> {
    rows! {
        "kg" => Mass, mass::kilogram;
        "g" => Mass, mass::gram;
        "t" => Mass, mass::ton;
        "lb" => Mass, mass::pound;
        "oz" => Mass, mass::ounce;
        "slug" => Mass, mass::slug;
        "short_ton" => Mass, mass::ton_short;
        "long_ton" => Mass, mass::ton_long;
        "N" => Force, force::newton;
        "kN" => Force, force::kilonewton;
        "kgf" => Force, force::kilogram_force;
        "lbf" => Force, force::pound_force;
        "ozf" => Force, force::ounce_force;
        "N·m" => Torque, torque::newton_meter;
        "mN·m" => Torque, torque::millinewton_meter;
        "kN·m" => Torque, torque::kilonewton_meter;
        "lbf·ft" => Torque, torque::pound_force_foot;
        "lbf·in" => Torque, torque::pound_force_inch;
        "ozf·in" => Torque, torque::ounce_force_inch;
        "kgf·m" => Torque, torque::kilogram_force_meter;
        "J" => Energy, energy::joule;
        "kJ" => Energy, energy::kilojoule;
        "Wh" => Energy, energy::watt_hour;
        "kWh" => Energy, energy::kilowatt_hour;
        "W" => Power, power::watt;
        "kW" => Power, power::kilowatt;
        "hp" => Power, power::horsepower;
        "PS" => Power, power::horsepower_metric;
        "hp_electric" => Power, power::horsepower_electric;
        "hp_boiler" => Power, power::horsepower_boiler;
        "Pa" => Pressure, pressure::pascal;
        "MPa" => Pressure, pressure::megapascal;
        "bar" => Pressure, pressure::bar;
        "mbar" => Pressure, pressure::millibar;
        "psi" => Pressure, pressure::psi;
        "atm" => Pressure, pressure::atmosphere;
        "mmH2O" => Pressure, pressure::millimeter_of_water;
        "inH2O" => Pressure, pressure::inch_of_water;
        "kgf/cm²" => Pressure, pressure::kilogram_force_per_square_centimeter;
        "kg·m²" => MomentOfInertia, moment_of_inertia::kilogram_square_meter;
        "kg/m³" => MassDensity, mass_density::kilogram_per_cubic_meter;
        "g/cm³" => MassDensity, mass_density::gram_per_cubic_centimeter;
        "lb/ft³" => MassDensity, mass_density::pound_per_cubic_foot;
        "kg/h" => MassRate, mass_rate::kilogram_per_hour;
        "Pa·s" => DynamicViscosity, dynamic_viscosity::pascal_second;
        "cP" => DynamicViscosity, dynamic_viscosity::centipoise;
        "cSt" => KinematicViscosity, kinematic_viscosity::centistokes;
        "kg·m/s" => Momentum, momentum::kilogram_meter_per_second;
        "MJ/kg" => AvailableEnergy, available_energy::megajoule_per_kilogram;
    }
}

fn electricity_and_heat() -> Vec<(&'static str, f64)> {
    rows! {
        "A" => ElectricCurrent, electric_current::ampere;
        "mA" => ElectricCurrent, electric_current::milliampere;
        "V" => ElectricPotential, electric_potential::volt;
        "kV" => ElectricPotential, electric_potential::kilovolt;
        "Ω" => ElectricalResistance, electrical_resistance::ohm;
        "mΩ" => ElectricalResistance, electrical_resistance::milliohm;
        "S" => ElectricalConductance, electrical_conductance::siemens;
        "H" => Inductance, inductance::henry;
        "mH" => Inductance, inductance::millihenry;
        "F" => Capacitance, capacitance::farad;
        "μF" => Capacitance, capacitance::microfarad;
        "C" => ElectricCharge, electric_charge::coulomb;
        "Ah" => ElectricCharge, electric_charge::ampere_hour;
        "Wb" => MagneticFlux, magnetic_flux::weber;
        "T" => MagneticFluxDensity, magnetic_flux_density::tesla;
        "K" => TemperatureInterval, temperature_interval::kelvin;
        "J/K" => HeatCapacity, heat_capacity::joule_per_kelvin;
        "J/(kg·K)" => SpecificHeatCapacity, specific_heat_capacity::joule_per_kilogram_kelvin;
        "W/(m²·K)" => HeatTransfer, heat_transfer::watt_per_square_meter_kelvin;
        "K/W" => ThermalResistance, thermal_resistance::kelvin_per_watt;
        "mol" => AmountOfSubstance, amount_of_substance::mole;
        "cd" => LuminousIntensity, luminous_intensity::candela;
        "%" => Ratio, ratio::percent;
        "‰" => Ratio, ratio::per_mille;
        "ppm" => Ratio, ratio::part_per_million;
    }
}

#[test]
fn factors_agree_with_uom() {
    let rows = [space_and_time(), mechanics(), electricity_and_heat()].concat();
    let mut apart = Vec::new();
    for (text, theirs) in rows {
        let ours = parse_unit(text).map_or_else(|error| panic!("{text}: {error:?}"), |unit| unit.factor);
        let difference = (ours / theirs - 1.0).abs();
        let coarse = COARSER.iter().find(|row| row.0 == text).map(|row| row.1);
        if difference > coarse.unwrap_or(TOLERANCE) {
            apart.push(format!("{text}: {ours} against {theirs}, {difference:e}"));
        }
    }
    assert!(apart.is_empty(), "{apart:#?}");
}

#[test]
fn levels_agree_with_uom() {
    let celsius =
        ThermodynamicTemperature::new::<uom::si::thermodynamic_temperature::degree_celsius>(40.0).value;
    let fahrenheit =
        ThermodynamicTemperature::new::<uom::si::thermodynamic_temperature::degree_fahrenheit>(104.0).value;
    for (text, value, theirs) in [("°C", 40.0, celsius), ("°F", 104.0, fahrenheit)] {
        let ours = parse_unit(text).map_or(f64::NAN, |unit| unit.to_si(value));
        assert!((ours - theirs).abs() <= 1e-9, "{text}: {ours} against {theirs}");
    }
}
