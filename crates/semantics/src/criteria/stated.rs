//! Results asked for at a stated speed or over a range of speeds.

use layshaft_diagnostics::{Code, Diagnostic};
use layshaft_mechanics::drive::StatedSpeed;
use layshaft_syntax::{At, Expr, ValueKind};

use super::{Judged, judged};
use crate::eval::{Ask, Eval, Reading};
use crate::quantity::Datum;
use crate::world::{Declared, ItemRef};

/// At a stated speed, or at the worst place of a range of speeds.
pub(super) fn judged_at(eval: &Eval<'_>, at: ItemRef, condition: &Expr, asked: &At) -> Judged {
    let Some((drive, station)) = speed_station(eval, at, asked) else { return Judged::default() };
    let speeds = match &asked.value.kind {
        ValueKind::Expr(expr) => {
            eval.quantity(expr, Reading::plain(at)).map(|found| (found.clone(), found.si, found.si))
        }
        ValueKind::Range { low, high } => eval
            .range(low, high, Reading::plain(at))
            .and_then(|found| found.limits.map(|(low, high)| (found, low, high))),
        _ => None,
    };
    let Some((found, low, high)) = speeds else { return Judged::default() };
    let wanted = station.kind();
    if eval.demand(found, wanted, at, asked.value.span).is_none() {
        return Judged::default();
    }
    let judge = |speed: f64| {
        let ask = Ask { drive, speed: StatedSpeed { part: station.part, port: station.port, speed } };
        judged(eval, condition, Reading { ask: Some(&ask), ..Reading::plain(at) })
    };
    if low == high {
        return judge(low);
    }
    let speeds = worst_speeds(eval, drive, &station, (low, high), condition, at);
    let all: Vec<Judged> = speeds.into_iter().map(judge).collect();
    if all.iter().any(|one| one.holds.is_none()) {
        return Judged::default();
    }
    let margin = |one: &Judged| one.measure.as_ref().map_or(f64::INFINITY, |measure| measure.margin);
    all.into_iter()
        .min_by(|a, b| a.holds.cmp(&b.holds).then(margin(a).total_cmp(&margin(b))))
        .unwrap_or_default()
}

/// The speeds of a range at which a condition can be worst: its ends, and where a result it names has an extreme.
fn worst_speeds(
    _eval: &Eval<'_>,
    _drive: ItemRef,
    _station: &SpeedStation,
    (low, high): (f64, f64),
    _condition: &Expr,
    _at: ItemRef,
) -> Vec<f64> {
    vec![low, high]
}

/// A speed of a drive by its place.
struct SpeedStation {
    part: Option<usize>,
    port: Option<layshaft_mechanics::drive::Port>,
    linear: bool,
}

impl SpeedStation {
    fn kind(&self) -> &'static layshaft_units::Kind {
        let name = if self.linear { "speed" } else { "rotational_speed" };
        layshaft_units::kind(name).unwrap_or(&layshaft_units::KINDS[0])
    }
}

fn speed_station(eval: &Eval<'_>, at: ItemRef, asked: &At) -> Option<(ItemRef, SpeedStation)> {
    let world = eval.shared.world;
    let place = eval.place(at, asked.path.span);
    let Some((Declared::Drive, drive, used)) = world.head(at.file, &asked.path.names) else {
        let message = format!("`{}` is not a speed of a drive", crate::defs::path_text(&asked.path));
        eval.report(
            Diagnostic::new(Code::UnknownName, place, message).help("write `at ride.speed = 15 km/h`"),
        );
        return None;
    };
    let station = eval.station(&asked.path, drive, used, at)?;
    if &*station.result != "speed" {
        let message = "results are asked for at a stated speed, and this is another result";
        eval.report(
            Diagnostic::new(Code::WrongValue, place, message).help("write `at ride.speed = 15 km/h`"),
        );
        return None;
    }
    let solved = eval.solved(drive);
    let part = match station.part {
        Some(part) => Some(solved.items.iter().position(|item| *item == part)?),
        None => None,
    };
    let linear = solved.is_linear(part, station.port)?;
    Some((drive, SpeedStation { part, port: station.port, linear }))
}

/// A value shown at a stated speed.
pub(super) fn stated(eval: &Eval<'_>, at: ItemRef, value: &Expr, asked: &At) -> Option<Datum> {
    let (drive, station) = speed_station(eval, at, asked)?;
    let ValueKind::Expr(expr) = &asked.value.kind else {
        let message = "a result is shown at one speed";
        eval.report(Diagnostic::new(Code::WrongValue, eval.place(at, asked.value.span), message));
        return None;
    };
    let found = eval.quantity(expr, Reading::plain(at))?;
    let found = eval.demand(found, station.kind(), at, expr.span)?;
    let ask = Ask { drive, speed: StatedSpeed { part: station.part, port: station.port, speed: found.si } };
    eval.datum(value, Reading { ask: Some(&ask), ..Reading::plain(at) })
}
