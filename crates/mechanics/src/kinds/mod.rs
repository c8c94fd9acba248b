//! Every kind of part: one file a kind, with its registry row and its model beside it. A new kind is its file and
//! one line in [`ROWS`].

pub(crate) mod derating;
mod fields;
pub mod loads;
mod reading;
pub mod sources;
pub mod supplies;
pub mod transmissions;

use crate::registry::KindRow;

/// Every kind, in the order of the reference.
pub static ROWS: &[&KindRow] = &[
    &supplies::mains::ROW,
    &supplies::battery::ROW,
    &supplies::dc_bus::ROW,
    &supplies::hydraulic_unit::ROW,
    &supplies::compressed_air::ROW,
    &sources::straight_line::ROW,
    &sources::straight_line_force::ROW,
    &sources::dc_motor::ROW,
    &sources::series_motor::ROW,
    &sources::induction_motor::ROW,
    &sources::induction_circuit::ROW,
    &sources::servo::ROW,
    &sources::engine::ROW,
    &sources::wind_turbine::ROW,
    &sources::water_turbine::ROW,
    &sources::hydraulic_motor::ROW,
    &sources::pneumatic_motor::ROW,
    &sources::person::ROW,
    &sources::measured_curve::ROW,
    &sources::polynomial::ROW,
    &sources::constant_speed::ROW,
    &transmissions::gear::ROW,
    &transmissions::gearbox::ROW,
    &transmissions::reversing_gear::ROW,
    &transmissions::variable::ROW,
    &transmissions::planetary::ROW,
    &transmissions::worm::ROW,
    &transmissions::belt::ROW,
    &transmissions::chain::ROW,
    &transmissions::friction_pulley::ROW,
    &transmissions::drum::ROW,
    &transmissions::reeving::ROW,
    &transmissions::wheel::ROW,
    &transmissions::screw::ROW,
    &transmissions::rack::ROW,
    &transmissions::crank::ROW,
    &transmissions::shaft::ROW,
    &transmissions::universal_joint::ROW,
    &transmissions::brake::ROW,
    &transmissions::freewheel::ROW,
    &transmissions::coupling::ROW,
    &transmissions::clutch::ROW,
    &transmissions::fluid_coupling::ROW,
    &loads::constant::ROW,
    &loads::viscous::ROW,
    &loads::quadratic::ROW,
    &loads::power_law::ROW,
    &loads::polynomial::ROW,
    &loads::constant_power::ROW,
    &loads::measured_curve::ROW,
    &loads::fan::ROW,
    &loads::pump::ROW,
    &loads::propeller::ROW,
    &loads::conveyor::ROW,
    &loads::cutting::ROW,
    &loads::work_stroke::ROW,
    &loads::generator::ROW,
    &loads::winder::ROW,
    &loads::hoist::ROW,
    &loads::off_axis_mass::ROW,
    &loads::incline::ROW,
    &loads::vehicle::ROW,
    &loads::flywheel::ROW,
];

#[cfg(test)]
mod tests;
