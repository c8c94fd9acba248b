//! A small chart as an image in Markdown: what is available and what is required over the speed, and the operating
//! points. Only numbers and words of our own stand in it; the text of the hover says all of it too.

use std::fmt::Write as _;

use layshaft_diagnostics::FileSpan;
use layshaft_mechanics::solution::Stability;
use layshaft_mechanics::solve::{Chart, ChartPoint, CurveRole};
use layshaft_present::number::{digits, shortened};
use layshaft_present::unit::{convert, usual_unit};
use layshaft_semantics::analysis::DriveCase;

use crate::Snapshot;

const WIDTH: f64 = 340.0;
const HEIGHT: f64 = 200.0;
const LEFT: f64 = 52.0;
const RIGHT: f64 = 12.0;
const TOP: f64 = 22.0;
const BOTTOM: f64 = 36.0;

/// The image; empty where there is nothing to draw.
pub(super) fn image(snapshot: &Snapshot, case: &DriveCase, part: Option<FileSpan>) -> String {
    let at = part.and_then(|place| case.parts.iter().position(|known| *known == place));
    let Some(chart) = case.solution.as_deref().and_then(|solution| solution.chart(at)) else {
        return String::new();
    };
    let Some(svg) = svg(snapshot, &chart) else { return String::new() };
    format!(
        "![{} over speed](data:image/svg+xml;base64,{})",
        chart.motion.effort_kind(),
        base64(svg.as_bytes())
    )
}

/// From values in SI to places in the picture. What lies outside is cut off where it is drawn.
struct Frame {
    speed: f64,
    effort: f64,
}

impl Frame {
    fn x(&self, speed: f64) -> f64 {
        LEFT + (WIDTH - LEFT - RIGHT) * (speed / self.speed).clamp(-1.0, 2.0)
    }
    fn y(&self, effort: f64) -> f64 {
        TOP + (HEIGHT - TOP - BOTTOM) * (1.0 - (effort / self.effort).clamp(-1.0, 2.0))
    }
}

fn svg(snapshot: &Snapshot, chart: &Chart) -> Option<String> {
    let curve = |role| chart.curves.iter().find(|curve| curve.role == role);
    let (available, required) = (curve(CurveRole::Available)?, curve(CurveRole::Required)?);
    let most = |values: &mut dyn Iterator<Item = f64>| values.filter(|v| v.is_finite()).fold(0.0, f64::max);
    let speed = most(&mut available.line.iter().map(|(speed, _)| *speed));
    let effort = most(&mut available.line.iter().map(|(_, effort)| *effort));
    let effort = effort.max(most(&mut chart.points.iter().map(|point| point.effort)) * 1.1);
    if speed <= 0.0 || effort <= 0.0 {
        return None;
    }
    let frame = Frame { speed, effort: effort * 1.05 };
    let mut out = format!(
        "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"{WIDTH}\" height=\"{HEIGHT}\" font-family=\"sans-serif\" \
         font-size=\"11\" fill=\"#808080\"><clipPath id=\"pane\"><rect x=\"{LEFT}\" y=\"{TOP}\" width=\"{}\" \
         height=\"{}\"/></clipPath>",
        WIDTH - LEFT - RIGHT,
        HEIGHT - TOP - BOTTOM + 8.0
    );
    axes(snapshot, chart, &frame, &mut out);
    line(&available.line, &frame, "stroke=\"#3a7fc2\" stroke-width=\"2\"", &mut out);
    line(&required.line, &frame, "stroke=\"#c2703a\" stroke-width=\"2\" stroke-dasharray=\"6 3\"", &mut out);
    name_available(&available.line, &frame, &mut out);
    name_required(&required.line, &available.line, &frame, &mut out);
    chart.points.iter().for_each(|point| mark(point, &frame, &mut out));
    out.push_str("</svg>");
    Some(out)
}

fn axes(snapshot: &Snapshot, chart: &Chart, frame: &Frame, out: &mut String) {
    let (right, bottom) = (WIDTH - RIGHT, HEIGHT - BOTTOM);
    let _ = write!(out, "<path d=\"M{LEFT} {TOP}V{bottom}H{right}\" fill=\"none\" stroke=\"#808080\"/>");
    let (across, up) = (chart.motion.speed_kind(), chart.motion.effort_kind());
    let speed_unit = snapshot.habits().unit(across, [frame.speed]);
    let effort_unit = usual_unit(up, [frame.effort]);
    let write = |value: f64| shortened(&digits(value, 3));
    let (fastest, most) = (convert(frame.speed, &speed_unit), convert(frame.effort, &effort_unit));
    for value in ticks(fastest) {
        let x = LEFT + (right - LEFT) * value / fastest;
        let _ = write!(
            out,
            "<path d=\"M{x:.1} {bottom}v4\" stroke=\"#808080\"/><text x=\"{x:.1}\" y=\"{}\" \
             text-anchor=\"middle\">{}</text>",
            bottom + 15.0,
            write(value)
        );
    }
    for value in ticks(most) {
        let y = bottom - (bottom - TOP) * value / most;
        let _ = write!(
            out,
            "<path d=\"M{LEFT} {y:.1}h-4\" stroke=\"#808080\"/><text x=\"{}\" y=\"{:.1}\" \
             text-anchor=\"end\">{}</text>",
            LEFT - 7.0,
            y + 4.0,
            write(value)
        );
    }
    let _ =
        write!(out, "<text x=\"{right}\" y=\"{}\" text-anchor=\"end\">{speed_unit}</text>", bottom + 30.0);
    let _ = write!(out, "<text x=\"4\" y=\"12\">{effort_unit}</text>");
}

fn line(points: &[(f64, f64)], frame: &Frame, style: &str, out: &mut String) {
    let places: Vec<String> = points
        .iter()
        .filter(|(speed, effort)| speed.is_finite() && effort.is_finite())
        .map(|(speed, effort)| format!("{:.1},{:.1}", frame.x(*speed), frame.y(*effort)))
        .collect();
    let _ = write!(
        out,
        "<polyline clip-path=\"url(#pane)\" points=\"{}\" fill=\"none\" {style}/>",
        places.join(" ")
    );
}

/// Round numbers from zero up, at most six.
fn ticks(most: f64) -> Vec<f64> {
    if !(most.is_finite() && most > 0.0) {
        return vec![0.0];
    }
    let mut power = 1.0;
    while power > most {
        power /= 10.0;
    }
    while power * 10.0 <= most {
        power *= 10.0;
    }
    let steps = [0.2, 0.5, 1.0, 2.0].map(|times| times * power);
    let step = steps.into_iter().find(|step| most / step < 6.0).unwrap_or(power);
    (0..6).map(|count| f64::from(count) * step).filter(|value| *value <= most).collect()
}

/// An operating point: filled where it is stable, an open diamond where it is not, a ring where the drive comes to it.
fn mark(point: &ChartPoint, frame: &Frame, out: &mut String) {
    let (x, y) = (frame.x(point.speed), frame.y(point.effort));
    let _ = if point.stability == Stability::Stable {
        write!(out, "<circle cx=\"{x:.1}\" cy=\"{y:.1}\" r=\"4\"/>")
    } else {
        write!(
            out,
            "<path d=\"M{x:.1} {:.1}l5 5l-5 5l-5 -5z\" fill=\"none\" stroke=\"#808080\" stroke-width=\"1.5\"/>",
            y - 5.0
        )
    };
    if point.reached {
        let _ = write!(
            out,
            "<circle cx=\"{x:.1}\" cy=\"{y:.1}\" r=\"7\" fill=\"none\" stroke=\"#808080\" stroke-width=\"1.5\"/>"
        );
    }
}

/// Its name stands over the highest place of the curve: no other part of it is there.
fn name_available(curve: &[(f64, f64)], frame: &Frame, out: &mut String) {
    let higher = |best: (f64, f64), place: &(f64, f64)| if place.1 > best.1 { *place } else { best };
    let (speed, effort) = curve.iter().fold((0.0, 0.0), higher);
    name("available", frame.x(speed), frame.y(effort) - 6.0, out);
}

/// Its name stands where the two curves are farthest apart, on the side away from the other.
fn name_required(curve: &[(f64, f64)], other: &[(f64, f64)], frame: &Frame, out: &mut String) {
    let gap = |at: usize| {
        let ((_, own), (_, other)) = (curve.get(at)?, other.get(at)?);
        let (own, other) = (frame.y(*own), frame.y(*other));
        let seen = (TOP..=HEIGHT - BOTTOM).contains(&own);
        seen.then_some(own - other)
    };
    let inner = curve.len() / 8..curve.len() * 7 / 8;
    let farther = |best: Option<(usize, f64)>, at: usize| match (best, gap(at)) {
        (Some((_, widest)), Some(gap)) if gap.abs() <= widest.abs() => best,
        (_, Some(gap)) => Some((at, gap)),
        (_, None) => best,
    };
    let Some((at, gap)) = inner.fold(None, farther) else { return };
    let Some((speed, effort)) = curve.get(at) else { return };
    name("required", frame.x(*speed), frame.y(*effort) + if gap > 0.0 { 14.0 } else { -6.0 }, out);
}

fn name(word: &str, x: f64, y: f64, out: &mut String) {
    let x = x.clamp(LEFT + 30.0, WIDTH - RIGHT - 30.0);
    let y = y.clamp(12.0, HEIGHT - BOTTOM - 3.0);
    let _ = write!(out, "<text x=\"{x:.0}\" y=\"{y:.0}\" text-anchor=\"middle\">{word}</text>");
}

/// Bytes as text (RFC 4648).
fn base64(bytes: &[u8]) -> String {
    const LETTERS: &[u8; 64] = b"ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/";
    let mut out = String::with_capacity(bytes.len().div_ceil(3) * 4);
    for three in bytes.chunks(3) {
        let whole =
            three.iter().fold(0u32, |sum, byte| sum << 8 | u32::from(*byte)) << (8 * (3 - three.len()));
        for at in 0..4 {
            let letter = LETTERS[(whole >> (18 - 6 * at) & 63) as usize];
            out.push(if at <= three.len() { char::from(letter) } else { '=' });
        }
    }
    out
}

#[cfg(test)]
mod tests {
    use super::{base64, ticks};

    #[test]
    fn round_numbers_along_an_axis() {
        assert_eq!(ticks(1620.0), [0.0, 500.0, 1000.0, 1500.0]);
        assert_eq!(ticks(80.8), [0.0, 20.0, 40.0, 60.0, 80.0]);
        assert_eq!(ticks(1.0), [0.0, 0.2, 0.4, 0.6000000000000001, 0.8, 1.0]);
        assert_eq!(ticks(f64::NAN), [0.0]);
        for most in [0.0012, 0.7, 3.0, 59.9, 60.0, 99.9, 4.2e9] {
            let found = ticks(most);
            assert!((3..=6).contains(&found.len()), "{most}: {found:?}");
        }
    }

    #[test]
    fn bytes_as_the_standard_writes_them() {
        // Test vectors of RFC 4648, section 10.
        for (text, coded) in
            [("", ""), ("f", "Zg=="), ("fo", "Zm8="), ("foo", "Zm9v"), ("foobar", "Zm9vYmFy")]
        {
            assert_eq!(base64(text.as_bytes()), coded);
        }
    }
}
