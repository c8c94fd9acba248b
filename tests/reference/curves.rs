//! What is drawn of a kind: the characteristic of its example, from the model that the solver asks.

use layshaft_mechanics::drive::PartSpec;
use layshaft_mechanics::model::{Feed, Known, Load, Model, Motion, Source, Supply, SupplyData, Transmission};
use layshaft_mechanics::registry::{KindRow, Role};
use layshaft_mechanics::values::FieldValue;

use crate::support;

/// Points of a curve.
const SAMPLES: usize = 120;

/// A curve and its name, which is written beside it.
pub struct Line {
    pub name: &'static str,
    /// SI values: across, up.
    pub points: Vec<(f64, f64)>,
    /// Drawn broken: a limit or a second reading, not the characteristic itself.
    pub broken: bool,
    /// Where its name stands, as a share of its width.
    pub label: f64,
    /// Whether its name stands below it.
    pub below: bool,
}

/// A curve with its name above it at a share of its width.
const fn line(name: &'static str, points: Vec<(f64, f64)>, broken: bool, label: f64) -> Line {
    Line { name, points, broken, label, below: false }
}

/// A chart without its looks.
pub struct Drawing {
    /// Kind of quantity and what it is: `rotational_speed`, "speed".
    pub across: (&'static str, &'static str),
    pub up: (&'static str, &'static str),
    pub lines: Vec<Line>,
}

/// The drawing of a kind's example; `None` where there is nothing to see.
pub fn of(row: &'static KindRow) -> Option<Drawing> {
    let parts = parts(row)?;
    let part = parts.iter().find(|part| part.row == row)?;
    let drawing = match (row.build)(&part.values).ok()? {
        Model::Source(source) => self::source(&*source, &feed(part, &parts)),
        Model::Load(load) => self::load(&*load),
        Model::Transmission(transmission) => self::transmission(&*transmission),
        Model::Supply(supply) => self::supply(&*supply),
    }?;
    let flat = |line: &Line| line.points.iter().all(|(_, up)| *up == 0.0);
    (!drawing.lines.iter().all(flat)).then_some(drawing)
}

/// The parts of the example as the solver gets them, in a drive that is made up around the part.
fn parts(row: &KindRow) -> Option<Vec<PartSpec>> {
    let analysis = support::analyze(row.example);
    let name = &analysis.parts.iter().find(|part| part.row == Some(row))?.name;
    let probe = "source probe_source: straight_line { stall_torque = 10 N·m; no_load_speed = 3000 rpm; braking = none }\n\
                 load probe_load: constant { torque = 1 N·m }\n";
    let chain = match row.role {
        Role::Supply => String::from("probe_motor -> probe_load"),
        Role::Source => format!("{name} -> probe_load"),
        Role::Transmission => format!("probe_source -> {name} -> probe_load"),
        Role::Load => format!("probe_source -> {name}"),
    };
    let motor = match row.role {
        Role::Supply => format!(
            "source probe_motor: dc_motor {{ supply = {name}; torque_constant = 0.1 N·m/A; resistance = 90 mΩ; \
             no_load_current = 1 A; braking = none }}\n"
        ),
        _ => String::new(),
    };
    let text = format!("{}\n{probe}{motor}drive probe = {chain} {{ direction = forward }}\n", row.example);
    let analysis = support::analyze(&text);
    let spec = analysis.drives.iter().find(|drive| drive.name == "probe")?.cases.first()?.spec.clone()?;
    Some(spec.parts.clone())
}

/// What the example's source hangs on.
fn feed(part: &PartSpec, parts: &[PartSpec]) -> Feed {
    let supply = match part.values.get("supply") {
        Some(FieldValue::Part(index)) => parts.get(*index).and_then(data),
        _ => None,
    };
    Feed { supply, machines: 1.0, ambient: None, altitude: None }
}

fn data(part: &PartSpec) -> Option<SupplyData> {
    match (part.row.build)(&part.values).ok()? {
        Model::Supply(supply) => Some(supply.data()),
        _ => None,
    }
}

/// Places from `low` to `high`, with both sides of every jump and every kink among them.
fn places(low: f64, high: f64, jumps: &[f64], kinks: &[f64]) -> Vec<f64> {
    let step = (high - low) / SAMPLES as f64;
    let mut out: Vec<f64> = (0..=SAMPLES).map(|at| low + step * at as f64).collect();
    out.extend(jumps.iter().flat_map(|jump| [jump - step * 1e-6, jump + step * 1e-6]));
    out.extend(kinks);
    out.retain(|x| (low..=high).contains(x));
    out.sort_by(f64::total_cmp);
    out
}

fn source(source: &dyn Source, feed: &Feed) -> Option<Drawing> {
    let known = source.characteristic(feed).ok()?;
    let (jumps, kinks) = (known.drive.jumps(), known.drive.kinks());
    let points = places(0.0, known.top_speed, &jumps, &kinks).into_iter().map(|x| (x, known.drive.at(x)));
    let motion = source.motion();
    let mut lines = vec![line("at full command", points.collect(), false, 0.5)];
    if let Some(effort) = source.ratings(None).effort {
        let points = vec![(0.0, effort), (known.top_speed, effort)];
        lines.push(line("for long", points, true, 0.12));
    }
    let up = (motion.effort_kind(), motion.effort_kind());
    Some(Drawing { across: (motion.speed_kind(), "speed"), up, lines })
}

fn load(load: &dyn Load) -> Option<Drawing> {
    let motion = load.motion();
    // A speed of usual size where the load knows none: 955 rpm, 5 m/s.
    let top = load.usual_speed().filter(|speed| *speed > 0.0).unwrap_or(if is_torque(motion) {
        100.0
    } else {
        5.0
    }) * 1.2;
    let demand = load.demand();
    let places = places(-top / 3.0, top, &demand.jumps(), &demand.kinks());
    let curve = places.into_iter().map(|x| (x, demand.at(x))).collect();
    let up = (motion.effort_kind(), motion.effort_kind());
    let mut lines = vec![line("required", curve, false, 0.8)];
    let rest = load.standstill().breakaway_forward;
    // Seen on the chart, not only in the last digit.
    if (rest - demand.at(top * 1e-6)).abs() > 0.01 * demand.at(top).abs().max(rest.abs()) {
        lines.push(line("to start it", vec![(0.0, rest), (top / 5.0, rest)], true, 1.0));
    }
    Some(Drawing { across: (motion.speed_kind(), "speed"), up, lines })
}

fn transmission(transmission: &dyn Transmission) -> Option<Drawing> {
    let (input, output) = (transmission.input(), transmission.output());
    let coupling = transmission.coupling(0);
    // What passes everything on as it is has nothing to show.
    if input == output && coupling.effort == 1.0 && coupling.forward == 1.0 {
        return None;
    }
    // A torque of usual size: the ratio is what is seen.
    let most = 10.0;
    let through = |factor: f64| vec![(0.0, 0.0), (most, most * coupling.effort * factor)];
    let driving = Line { below: true, ..line("driving", through(coupling.forward), false, 0.5) };
    let mut lines = vec![driving];
    match coupling.backward {
        Known::Value(backward) if backward > 0.0 && backward * coupling.forward < 1.0 => {
            lines.push(line("driven back", through(1.0 / backward), true, 0.7));
        }
        _ => {}
    }
    let across =
        (input.effort_kind(), if is_torque(input) { "torque at the input" } else { "force at the input" });
    let up = (
        output.effort_kind(),
        if is_torque(output) { "torque at the output" } else { "force at the output" },
    );
    Some(Drawing { across, up, lines })
}

fn is_torque(motion: Motion) -> bool {
    motion == Motion::Rotary
}

fn supply(supply: &dyn Supply) -> Option<Drawing> {
    let data = supply.data();
    let voltage = data.voltage?;
    // Up to its limit, else to where it has lost a fifth.
    let lost = data.resistance.filter(|r| *r > 0.0).map(|r| 0.2 * voltage / r);
    let top = data.current_limit.or(lost)?;
    let points = vec![(0.0, supply.terminal(0.0)), (top, supply.terminal(top))];
    let lines = vec![line("at its terminals", points, false, 0.5)];
    Some(Drawing { across: ("current", "current"), up: ("voltage", "voltage"), lines })
}
