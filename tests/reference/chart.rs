//! A drawing as SVG: plain axes with round numbers, names beside their curves. Colours that show on light and dark.

use std::fmt::Write as _;

use layshaft_present::number::{digits, shortened};
use layshaft_present::unit::{convert, usual_unit};

use crate::curves::{Drawing, Line};

const WIDTH: f64 = 420.0;
const HEIGHT: f64 = 250.0;
const LEFT: f64 = 58.0;
const RIGHT: f64 = 18.0;
const TOP: f64 = 30.0;
const BOTTOM: f64 = 42.0;
const INK: &str = "#6b7280";
const CURVE: &str = "#2563a8";
const SECOND: &str = "#b4561f";

/// One axis, in its unit.
struct Axis {
    unit: String,
    low: f64,
    high: f64,
    step: f64,
}

impl Axis {
    fn of(kind: &'static str, values: &[f64]) -> Option<Self> {
        let unit = usual_unit(kind, values.iter().copied());
        let shown = values.iter().map(|si| convert(*si, &unit)).filter(|value| value.is_finite());
        let (low, high) =
            shown.fold((0.0_f64, 0.0_f64), |(low, high), value| (low.min(value), high.max(value)));
        if high <= low {
            return None;
        }
        let step = round_step((high - low) / 4.0);
        Some(Self { unit, low: (low / step).floor() * step, high: (high / step).ceil() * step, step })
    }

    /// The share of the axis at an SI value.
    fn share(&self, si: f64) -> f64 {
        (convert(si, &self.unit) - self.low) / (self.high - self.low)
    }

    fn ticks(&self) -> impl Iterator<Item = f64> {
        let count = ((self.high - self.low) / self.step).round() as usize;
        let (low, step) = (self.low, self.step);
        (0..=count).map(move |at| low + step * at as f64)
    }
}

/// 1, 2 or 5 times a power of ten, at least `least`.
fn round_step(least: f64) -> f64 {
    let mut step = 1.0;
    while step > least {
        step /= 10.0;
    }
    while step * 10.0 <= least {
        step *= 10.0;
    }
    [1.0, 2.0, 5.0, 10.0].into_iter().map(|times| times * step).find(|step| *step >= least).unwrap_or(step)
}

/// The chart; `None` where all values are one.
pub fn svg(drawing: &Drawing) -> Option<String> {
    let values = |pick: fn(&(f64, f64)) -> f64| -> Vec<f64> {
        drawing.lines.iter().flat_map(|line| &line.points).map(pick).collect()
    };
    let across = Axis::of(drawing.across.0, &values(|point| point.0))?;
    let up = Axis::of(drawing.up.0, &values(|point| point.1))?;
    let mut out = format!(
        "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"{WIDTH}\" height=\"{HEIGHT}\" viewBox=\"0 0 {WIDTH} {HEIGHT}\" \
         font-family=\"sans-serif\" font-size=\"12\" fill=\"{INK}\">\n"
    );
    axes(drawing, &across, &up, &mut out);
    drawing.lines.iter().for_each(|line| curve(line, &across, &up, &mut out));
    out.push_str("</svg>\n");
    Some(out)
}

fn x(axis: &Axis, si: f64) -> f64 {
    LEFT + (WIDTH - LEFT - RIGHT) * axis.share(si)
}

fn y(axis: &Axis, si: f64) -> f64 {
    TOP + (HEIGHT - TOP - BOTTOM) * (1.0 - axis.share(si))
}

fn axes(drawing: &Drawing, across: &Axis, up: &Axis, out: &mut String) {
    let (right, bottom) = (WIDTH - RIGHT, HEIGHT - BOTTOM);
    let zero = y(up, 0.0);
    let _ = writeln!(
        out,
        "<path d=\"M{LEFT} {TOP}V{bottom}M{LEFT} {zero:.1}H{right}\" stroke=\"{INK}\" fill=\"none\"/>"
    );
    let number =
        |value: f64, step: f64| shortened(&digits(if value.abs() < step / 2.0 { 0.0 } else { value }, 4));
    for tick in across.ticks() {
        let place = LEFT + (right - LEFT) * (tick - across.low) / (across.high - across.low);
        let text = number(tick, across.step);
        let _ = writeln!(out, "<path d=\"M{place:.1} {bottom}v4\" stroke=\"{INK}\"/>");
        let _ = writeln!(
            out,
            "<text x=\"{place:.1}\" y=\"{}\" text-anchor=\"middle\">{text}</text>",
            bottom + 17.0
        );
    }
    for tick in up.ticks() {
        let place = TOP + (bottom - TOP) * (1.0 - (tick - up.low) / (up.high - up.low));
        let text = number(tick, up.step);
        let _ = writeln!(out, "<path d=\"M{LEFT} {place:.1}h-4\" stroke=\"{INK}\"/>");
        let _ = writeln!(
            out,
            "<text x=\"{}\" y=\"{:.1}\" text-anchor=\"end\">{text}</text>",
            LEFT - 8.0,
            place + 4.0
        );
    }
    let titled = |(_, name): (&str, &str), unit: &str| format!("{name}, {unit}");
    let _ = writeln!(
        out,
        "<text x=\"{right}\" y=\"{}\" text-anchor=\"end\">{}</text>",
        bottom + 34.0,
        titled(drawing.across, &across.unit)
    );
    let _ = writeln!(out, "<text x=\"6\" y=\"16\">{}</text>", titled(drawing.up, &up.unit));
}

fn curve(line: &Line, across: &Axis, up: &Axis, out: &mut String) {
    let colour = if line.broken { SECOND } else { CURVE };
    let dashes = if line.broken { " stroke-dasharray=\"6 4\"" } else { "" };
    let points: Vec<String> =
        line.points.iter().map(|(a, b)| format!("{:.1},{:.1}", x(across, *a), y(up, *b))).collect();
    let _ = writeln!(
        out,
        "<polyline points=\"{}\" fill=\"none\" stroke=\"{colour}\" stroke-width=\"2\"{dashes}/>",
        points.join(" ")
    );
    label(line, colour, across, up, out);
}

/// The name of a curve beside it: above where it falls or lies flat, to the left above where it rises, so that the curve
/// does not cross it. A short line bears its name at its end.
fn label(line: &Line, colour: &str, across: &Axis, up: &Axis, out: &mut String) {
    let places: Vec<(f64, f64)> = line.points.iter().map(|(a, b)| (x(across, *a), y(up, *b))).collect();
    let (Some(first), Some(last)) = (places.first(), places.last()) else { return };
    let at = first.0 + (last.0 - first.0) * line.label;
    let short = last.0 - first.0 < (WIDTH - LEFT - RIGHT) / 3.0;
    let next = places.iter().position(|place| place.0 >= at).unwrap_or(places.len() - 1).max(1);
    let (before, after) = (places[next - 1], places[next]);
    let slope = (after.1 - before.1) / (after.0 - before.0).max(1e-9);
    let height = before.1 + slope * (at - before.0);
    let (place, height, anchor) = if short {
        (last.0 + 6.0, last.1 + 4.0, "start")
    } else if line.below {
        (at + 8.0, height + 14.0, "start")
    } else if slope < -0.05 {
        (at - 6.0, height - 5.0, "end")
    } else if slope > 0.05 {
        (at + 6.0, height - 5.0, "start")
    } else {
        (at, if height < TOP + 10.0 { height + 16.0 } else { height - 7.0 }, "middle")
    };
    let _ = writeln!(
        out,
        "<text x=\"{place:.1}\" y=\"{height:.1}\" text-anchor=\"{anchor}\" fill=\"{colour}\">{}</text>",
        line.name
    );
}
