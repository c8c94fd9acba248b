//! A small chart as an image in Markdown: what is available and what is required over the speed, and the operating
//! points. Only numbers and words of our own stand in it; the text of the hover says all of it too.

use std::fmt::Write as _;

use layshaft_diagnostics::FileSpan;
use layshaft_mechanics::solution::Stability;
use layshaft_mechanics::solve::{Chart, CurveRole};
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

/// From values in SI to places in the picture.
struct Frame {
    speed: f64,
    effort: f64,
}

impl Frame {
    fn x(&self, speed: f64) -> f64 {
        LEFT + (WIDTH - LEFT - RIGHT) * (speed / self.speed).clamp(-0.02, 1.02)
    }
    fn y(&self, effort: f64) -> f64 {
        TOP + (HEIGHT - TOP - BOTTOM) * (1.0 - (effort / self.effort).clamp(-0.05, 1.05))
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
         font-size=\"11\" fill=\"#808080\">"
    );
    axes(snapshot, chart, &frame, &mut out);
    line(&available.line, &frame, "stroke=\"#3a7fc2\" stroke-width=\"2\"", &mut out);
    line(&required.line, &frame, "stroke=\"#c2703a\" stroke-width=\"2\" stroke-dasharray=\"6 3\"", &mut out);
    name(&available.line, 0.25, "available", &frame, &mut out);
    name(&required.line, 0.6, "required", &frame, &mut out);
    for point in &chart.points {
        let (x, y) = (frame.x(point.speed), frame.y(point.effort));
        let fill = if point.stability == Stability::Stable { "#808080" } else { "none" };
        let size = if point.reached { 5 } else { 3 };
        let _ = write!(
            out,
            "<circle cx=\"{x:.1}\" cy=\"{y:.1}\" r=\"{size}\" fill=\"{fill}\" stroke=\"#808080\"/>"
        );
    }
    out.push_str("</svg>");
    Some(out)
}

fn axes(snapshot: &Snapshot, chart: &Chart, frame: &Frame, out: &mut String) {
    let (right, bottom) = (WIDTH - RIGHT, HEIGHT - BOTTOM);
    let _ = write!(out, "<path d=\"M{LEFT} {TOP}V{bottom}H{right}\" fill=\"none\" stroke=\"#808080\"/>");
    let (across, up) = (chart.motion.speed_kind(), chart.motion.effort_kind());
    let speed_unit = snapshot.habits().unit(across, [frame.speed]);
    let effort_unit = usual_unit(up, [frame.effort]);
    let write = |si: f64, unit: &str| shortened(&digits(convert(si, unit), 3));
    for share in [0.5, 1.0] {
        let x = LEFT + (right - LEFT) * share;
        let y = bottom - (bottom - TOP) * share;
        let (speed, effort) =
            (write(frame.speed * share, &speed_unit), write(frame.effort * share, &effort_unit));
        let _ = write!(out, "<text x=\"{x:.0}\" y=\"{}\" text-anchor=\"end\">{speed}</text>", bottom + 14.0);
        let _ = write!(
            out,
            "<text x=\"{}\" y=\"{:.0}\" text-anchor=\"end\">{effort}</text>",
            LEFT - 4.0,
            y + 4.0
        );
    }
    let _ =
        write!(out, "<text x=\"{right}\" y=\"{}\" text-anchor=\"end\">{speed_unit}</text>", bottom + 28.0);
    let _ = write!(out, "<text x=\"4\" y=\"12\">{effort_unit}</text>");
}

fn line(points: &[(f64, f64)], frame: &Frame, style: &str, out: &mut String) {
    let places: Vec<String> = points
        .iter()
        .filter(|(speed, effort)| speed.is_finite() && effort.is_finite())
        .map(|(speed, effort)| format!("{:.1},{:.1}", frame.x(*speed), frame.y(*effort)))
        .collect();
    let _ = write!(out, "<polyline points=\"{}\" fill=\"none\" {style}/>", places.join(" "));
}

/// The name of a curve, beside it.
fn name(points: &[(f64, f64)], share: f64, word: &str, frame: &Frame, out: &mut String) {
    let Some((speed, effort)) = points.get((points.len() as f64 * share) as usize) else { return };
    let (x, y) = (frame.x(*speed), (frame.y(*effort) - 5.0).max(10.0));
    let _ = write!(out, "<text x=\"{x:.0}\" y=\"{y:.0}\">{word}</text>");
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
    use super::base64;

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
