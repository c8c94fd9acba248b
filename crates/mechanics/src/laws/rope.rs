//! Drum, layers of rope, and reeving.
//!
//! Formula: `v = w * D / 2`, `F = 2 * T / D`; layer n of a drum: `D_n = D_1 + 2 * (n - 1) * d`; reeving:
//! `v_load = v_rope / n_f`, `F_load = n_f * F_rope`.
//! Symbols: D pitch diameter, from rope centre to rope centre (m); d diameter of the rope (m); n layer, counted from
//! the barrel (-); n_f falls of rope that carry the load (-); v speed (m/s); F force (N); w speed (rad/s);
//! T torque (N·m).
//! Validity: rope thin against the drum. Layers that nest lie a little lower (up to 13 % of the growth): the
//! formula is on the safe side for torque and speed.
//! Source: hoisting winches, common practice; no single source.
//! Revision: 1

use super::Checked;
use crate::registry::Formula;

/// Pitch diameter of a layer.
pub const LAYER_DIAMETER: Formula = Formula {
    name: "layer_diameter",
    text: "D_1 + 2 * (n - 1) * d",
    symbols: &[
        ("D_1", "length", "pitch diameter of the first layer"),
        ("n", "count", "layer, counted from the barrel"),
        ("d", "length", "diameter of the rope"),
    ],
    validity: "layers stacked, not nested: the largest diameter the layer can have",
    source: "common practice, no source",
    revision: 1,
};

/// Speed of the rope.
pub const ROPE_SPEED: Formula = Formula {
    name: "speed",
    text: "w * D / 2",
    symbols: &[
        ("w", "rotational_speed", "speed of the drum"),
        ("D", "length", "pitch diameter of the layer"),
    ],
    validity: "rope thin against the drum",
    source: "definition",
    revision: 1,
};

/// Pull of the rope.
pub const ROPE_PULL: Formula = Formula {
    name: "force",
    text: "2 * eta * T / D",
    symbols: &[
        ("eta", "percentage", "efficiency, power flowing to the load"),
        ("T", "torque", "torque on the drum"),
        ("D", "length", "pitch diameter of the layer"),
    ],
    validity: "power flows to the load",
    source: "balance of power",
    revision: 1,
};

/// Force at the hook.
pub const HOOK_FORCE: Formula = Formula {
    name: "force",
    text: "n * eta * F",
    symbols: &[
        ("n", "count", "falls that carry the load"),
        ("eta", "percentage", "efficiency, power flowing to the load"),
        ("F", "force", "pull of the rope"),
    ],
    validity: "power flows to the load; falls as good as parallel",
    source: "balance of power",
    revision: 1,
};

/// The formulas with the kernels that must equal them.
pub const CHECKED: &[Checked] = &[
    Checked {
        formula: &LAYER_DIAMETER,
        domain: &[(0.05, 2.0), (1.0, 8.0), (0.002, 0.05)],
        kernel: |x| layer_diameter(x[0], x[2], x[1]),
    },
    Checked {
        formula: &ROPE_SPEED,
        domain: &[(-50.0, 50.0), (0.05, 2.0)],
        kernel: |x| x[0] / drum_ratio(x[1]),
    },
    Checked {
        formula: &ROPE_PULL,
        domain: &[(0.5, 1.0), (0.0, 1e5), (0.05, 2.0)],
        kernel: |x| x[1] * drum_ratio(x[2]) * x[0],
    },
    Checked {
        formula: &HOOK_FORCE,
        domain: &[(1.0, 8.0), (0.5, 1.0), (0.0, 1e5)],
        kernel: |x| crate::laws::gear::torque_forward(x[2], x[0], x[1]),
    },
];

/// Pitch diameter (m) of a layer, the first being 1.
#[must_use]
pub fn layer_diameter(first: f64, rope_diameter: f64, layer: f64) -> f64 {
    first + 2.0 * (layer - 1.0) * rope_diameter
}

/// Turning speed over rope speed of a drum of this pitch diameter (rad/s per m/s).
#[must_use]
pub fn drum_ratio(pitch_diameter: f64) -> f64 {
    2.0 / pitch_diameter
}

#[cfg(test)]
mod tests {
    use super::{drum_ratio, layer_diameter};
    use crate::laws::testing::close;

    #[test]
    fn layers_grow_by_two_ropes() {
        close(layer_diameter(0.3, 0.012, 1.0), 0.3, 1e-15);
        close(layer_diameter(0.3, 0.012, 4.0), 0.372, 1e-14);
    }

    #[test]
    fn published_drum() {
        // R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, Ex. 3.2 (g = 9.81 m/s²): cage of 500 kg and
        // 100 m of rope of 3 kg/m at 1.5 m/s², drum of 250 kg, radius 0.5 m, radius of gyration 0.35 m.
        let ratio = drum_ratio(1.0);
        let pull = (500.0 + 300.0) * (9.81 + 1.5);
        let torque = pull / ratio + 250.0 * 0.35 * 0.35 * 1.5 * ratio;
        close(torque, 4615.875, 1e-10);
    }
}
