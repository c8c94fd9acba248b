//! The model most transmissions share: two ports coupled by numbers that the fields fix once and for all.

use crate::curve::Curve;
use crate::fault::Note;
use crate::kinds::reading::limits;
use crate::laws::fluid_coupling::Fluid;
use crate::laws::shaft::Drag;
use crate::model::{
    Brake, Coupling, Grip, Known, Limit, LimitOn, Model, Motion, Slip, Transmission, TransmissionState,
};
use crate::solution::{Answer, Marks};
use crate::values::Values;

/// Symbols of a row's formulas with their values.
pub(super) type Symbols = Vec<(&'static str, f64)>;

/// A result of a kind's own that follows from where the part stands.
#[derive(Clone, Copy, Debug)]
pub(super) struct Own {
    /// Its name in the row.
    pub name: &'static str,
    /// Its kind.
    pub kind: &'static str,
    /// Its SI value.
    pub value: fn(&Fixed, &TransmissionState) -> f64,
}

/// A part of fixed coupling.
#[derive(Debug)]
pub(super) struct Fixed {
    /// How input and output move.
    pub ports: (Motion, Motion),
    /// How they are coupled.
    pub coupling: Coupling,
    /// Its inertia.
    pub inertia: f64,
    /// Limits.
    pub limits: Vec<Limit>,
    /// Whether it passes only driving effort.
    pub one_way: bool,
    /// Its brake.
    pub brake: Option<Brake>,
    /// Its hold on the ground.
    pub grip: Option<Grip>,
    /// Its drag.
    pub drag: Option<Drag>,
    /// Whether it passes nothing.
    pub open: bool,
    /// Its law, where its ports have no fixed ratio of speeds.
    pub fluid: Option<Fluid>,
    /// Whether its inertia sits at its output.
    pub at_output: bool,
    /// How far it is from slipping.
    pub slip: Option<fn(&Fixed, &TransmissionState) -> Slip>,
    /// Symbols that stay as they are.
    pub constants: Symbols,
    /// Numbers that no formula of the row names.
    pub hidden: Symbols,
    /// Symbols that depend on where it stands.
    pub symbols: fn(&Coupling, &TransmissionState) -> Symbols,
    /// Results of its own.
    pub own: &'static [Own],
}

impl Fixed {
    /// Two turning shafts at one speed, nothing lost, with the inertia among `values`.
    pub(super) fn shafts(values: &Values) -> Self {
        Self {
            ports: (Motion::Rotary, Motion::Rotary),
            coupling: Coupling::ideal(1.0),
            inertia: values.si("inertia").unwrap_or(0.0),
            limits: Vec::new(),
            one_way: false,
            brake: None,
            grip: None,
            drag: None,
            open: false,
            fluid: None,
            at_output: false,
            slip: None,
            constants: Vec::new(),
            hidden: Vec::new(),
            symbols: |_, _| Vec::new(),
            own: &[],
        }
    }

    /// A ratio with the efficiencies among `values`, those given as fields of their own.
    pub(super) fn geared(values: &Values, ratio: f64) -> Self {
        let coupling = Coupling {
            forward: values.si("efficiency").unwrap_or(1.0),
            backward: Known::of(values.si("efficiency_backward"), "efficiency_backward"),
            ..Coupling::ideal(ratio)
        };
        Self { coupling, ..Self::shafts(values) }
    }

    /// The same with the limits that are given.
    pub(super) fn limited(self, values: &Values, fields: &[(&'static str, LimitOn)]) -> Self {
        Self { limits: limits(values, fields), ..self }
    }

    /// A number that stays as it is.
    pub(super) fn known(&self, name: &str) -> Option<f64> {
        let mut all = self.constants.iter().chain(&self.hidden);
        all.find(|(symbol, _)| *symbol == name).map(|(_, si)| *si)
    }

    /// The same; 0 where it has none.
    pub(super) fn constant(&self, name: &str) -> f64 {
        self.known(name).unwrap_or(0.0)
    }

    /// How far it is from slipping.
    pub(super) fn slip_at(&self, state: &TransmissionState) -> Option<Slip> {
        self.slip.map(|slip| slip(self, state))
    }

    /// As a model.
    pub(super) fn model(self) -> Model {
        Model::Transmission(Box::new(self))
    }
}

impl Transmission for Fixed {
    fn input(&self) -> Motion {
        self.ports.0
    }

    fn output(&self) -> Motion {
        self.ports.1
    }

    fn coupling(&self, _gear: usize) -> Coupling {
        self.coupling
    }

    fn input_inertia(&self) -> Known {
        Known::Value(if self.at_output { 0.0 } else { self.inertia })
    }

    fn output_inertia(&self) -> Known {
        Known::Value(if self.at_output { self.inertia } else { 0.0 })
    }

    fn limits(&self) -> Vec<Limit> {
        self.limits.clone()
    }

    fn brake(&self) -> Option<Brake> {
        self.brake
    }

    fn one_way(&self) -> bool {
        self.one_way
    }

    fn grip(&self) -> Option<Grip> {
        self.grip
    }

    fn drag(&self) -> Option<Box<dyn Curve>> {
        let drag = self.drag?;
        Some(Box::new(drag))
    }

    fn open(&self, _gear: usize) -> bool {
        self.open
    }

    fn fluid(&self) -> Option<Fluid> {
        self.fluid
    }

    fn slip(&self, state: &TransmissionState) -> Option<Slip> {
        self.slip_at(state)
    }

    fn answer(&self, name: &str, state: &TransmissionState) -> Option<Answer> {
        let own = self.own.iter().find(|own| own.name == name)?;
        let si = (own.value)(self, state);
        if si.is_finite() {
            return Some(Answer::Quantity { si, kind: own.kind, marks: Marks::default() });
        }
        Some(Answer::Absent(Note::plain("nothing passes here, or a field that says it is not given")))
    }

    fn symbols(&self, state: &TransmissionState) -> Symbols {
        let mut out = (self.symbols)(&self.coupling, state);
        out.extend(&self.constants);
        out
    }
}
