//! Results asked for at a stated speed or over a range of speeds.

use layshaft_diagnostics::{Code, Diagnostic};
use layshaft_mechanics::drive::StatedSpeed;
use layshaft_mechanics::solve::Question;
use layshaft_syntax::{At, BinaryOp, Expr, ExprKind, Path, ValueKind};

use super::{Judged, judged};
use crate::eval::{Ask, Eval, Reading};
use crate::quantity::{Datum, Quantity};
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
    let Some((found, low, high)) = speeds.filter(|(found, ..)| found.is_known()) else {
        return Judged::default();
    };
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
    let Some(speeds) = worst_speeds(eval, drive, &station, (low, high), condition, at) else {
        return Judged::default();
    };
    let all: Vec<Judged> = speeds.into_iter().map(judge).collect();
    if all.iter().any(|one| one.holds.is_none()) {
        return Judged::default();
    }
    let margin = |one: &Judged| one.measure.as_ref().map_or(f64::INFINITY, |measure| measure.margin);
    all.into_iter()
        .min_by(|a, b| a.holds.cmp(&b.holds).then(margin(a).total_cmp(&margin(b))))
        .unwrap_or_default()
}

/// The speeds of a range at which a condition can be worst: where a result it compares is least or greatest, and where
/// one has no answer. None where the condition is no comparison of single results with limits: its worst place could
/// lie anywhere between.
fn worst_speeds(
    eval: &Eval<'_>,
    drive: ItemRef,
    station: &SpeedStation,
    (low, high): (f64, f64),
    condition: &Expr,
    at: ItemRef,
) -> Option<Vec<f64>> {
    let mut paths = Vec::new();
    if !single_results(condition, &mut paths) {
        let place = eval.place(at, condition.span);
        let message = "over a range of speeds, each comparison is of one result with a limit";
        eval.report(Diagnostic::new(Code::WrongValue, place, message).help(
            "write `ride.motor.current <= 30 A at ride.speed = 5 km/h .. 25 km/h`, one result to a criterion",
        ));
        return None;
    }
    let solved = eval.solved(drive);
    let handle = solved.drive.as_ref()?;
    let mut speeds = Vec::new();
    for path in paths {
        let Some((Declared::Drive, own, used)) = eval.shared.world.head(at.file, &path.names) else {
            continue;
        };
        if own != drive {
            continue;
        }
        let asked = eval.station(path, drive, used, at)?;
        let part = match asked.part {
            Some(part) => Some(solved.items.iter().position(|item| *item == part)?),
            None => None,
        };
        let question = Question { part, port: asked.port, name: &asked.result };
        match eval.shared.solver.worst_over(handle, (station.part, station.port), (low, high), question) {
            Ok(extremes) => {
                speeds.extend([extremes.least.0, extremes.greatest.0]);
                speeds.extend(extremes.unanswered.map(|(speed, _)| speed));
            }
            Err(faults) => {
                solved.report(eval, drive, &faults);
                return None;
            }
        }
    }
    speeds.sort_by(f64::total_cmp);
    speeds.dedup();
    if speeds.is_empty() {
        speeds.push(low);
    }
    Some(speeds)
}

/// The results a condition compares, if each stands alone on its side.
fn single_results<'e>(condition: &'e Expr, found: &mut Vec<&'e Path>) -> bool {
    match &condition.kind {
        ExprKind::Paren(inner) => single_results(inner, found),
        ExprKind::Binary { op: BinaryOp::And, left, right, .. } => {
            single_results(left, found) && single_results(right, found)
        }
        ExprKind::Compare { first, rest } => {
            let sides = || std::iter::once(&**first).chain(rest.iter().map(|(_, _, side)| side));
            let mut results = 0;
            for side in sides() {
                if let ExprKind::Path(path) = &side.kind {
                    found.push(path);
                    results += usize::from(path.names.len() > 1);
                } else if super::measure::has_result(side) {
                    return false;
                }
            }
            results <= 1
        }
        _ => false,
    }
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
    let found = eval.quantity(expr, Reading::plain(at)).filter(Quantity::is_known)?;
    let found = eval.demand(found, station.kind(), at, expr.span)?;
    let ask = Ask { drive, speed: StatedSpeed { part: station.part, port: station.port, speed: found.si } };
    eval.datum(value, Reading { ask: Some(&ask), ..Reading::plain(at) })
}
