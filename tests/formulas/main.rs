//! The formulas that are printed, read by the language itself, against the kernels that compute: what a reader is shown
//! is what is done.

use std::sync::Arc;

use layshaft_mechanics::laws::{Checked, checked};
use layshaft_semantics::quantity::Datum;
use layshaft_semantics::{NoFiles, analyze};

/// Inputs tried for each formula.
const TRIES: u64 = 24;
/// Largest difference of the two, relative to the larger of the value and `floor`.
const TOLERANCE: f64 = 1e-9;

/// Numbers in 0 .. 1 that look like chance and are the same on every machine (splitmix64).
struct Chance(u64);

impl Chance {
    fn next(&mut self) -> f64 {
        self.0 = self.0.wrapping_add(0x9e37_79b9_7f4a_7c15);
        let mut mixed = self.0;
        mixed = (mixed ^ (mixed >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        mixed = (mixed ^ (mixed >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
        ((mixed ^ (mixed >> 31)) >> 11) as f64 / (1_u64 << 53) as f64
    }
}

/// A value as the language writes it: in the unit its kind is usually given in.
fn written(kind: &str, si: f64) -> String {
    let kind = layshaft_units::kind(kind).unwrap_or_else(|| panic!("no kind of quantity is called {kind}"));
    if kind.unit.is_empty() {
        return si.to_string();
    }
    let unit = layshaft_units::parse_unit(kind.unit).unwrap_or_else(|_| panic!("{} has no unit", kind.name));
    format!("{} {}", unit.from_si(si), unit.text)
}

/// The formula with its symbols given, as a spec.
fn spec(law: &Checked, inputs: &[f64]) -> String {
    let symbols = law.formula.symbols.iter().zip(inputs);
    let lets = symbols.map(|((name, kind, _), si)| format!("let {name}: {kind} = {}\n", written(kind, *si)));
    let lets: String = lets.collect();
    format!("{lets}let the_result = {}\n", law.formula.text)
}

/// What the language makes of it, SI.
fn evaluated(law: &Checked, spec: &str) -> Result<f64, String> {
    let analysis = analyze("formula.shaft", Arc::from(spec), &NoFiles);
    let result = analysis.values.iter().find(|value| value.name == "the_result");
    match result.and_then(|value| value.value.as_ref()) {
        Some(Datum::Quantity(found)) => Ok(found.si),
        other => Err(format!("{}: {other:?}\n{spec}{:#?}", law.formula.name, analysis.diagnostics)),
    }
}

/// Says where formula and kernel differ.
fn differs(law: &Checked, chance: &mut Chance) -> Option<String> {
    let inputs: Vec<f64> = law.domain.iter().map(|(low, high)| low + (high - low) * chance.next()).collect();
    let spec = spec(law, &inputs);
    let by_kernel = (law.kernel)(&inputs);
    let by_text = match evaluated(law, &spec) {
        Ok(value) => value,
        Err(why) => return Some(why),
    };
    // Differences of large terms lose digits on both sides: judged against the size of the inputs' largest change.
    let near = inputs
        .iter()
        .map(|input| (law.kernel)(&scaled(&inputs, *input)))
        .fold(0.0_f64, |a, b| a.max(b.abs()));
    let size = by_kernel.abs().max(1e-3 * near);
    ((by_text - by_kernel).abs() > TOLERANCE * size)
        .then(|| format!("{}: the text gives {by_text}, the kernel {by_kernel}\n{spec}", law.formula.text))
}

/// The inputs with each that equals `input` a tenth larger.
fn scaled(inputs: &[f64], input: f64) -> Vec<f64> {
    inputs.iter().map(|one| if *one == input { one * 1.1 } else { *one }).collect()
}

#[test]
fn what_is_printed_is_what_is_computed() {
    let mut chance = Chance(1);
    let mut wrong = Vec::new();
    let mut laws = 0;
    for law in checked() {
        laws += 1;
        wrong.extend((0..TRIES).find_map(|_| differs(law, &mut chance)));
    }
    assert!(laws > 30, "only {laws} laws are checked");
    assert!(wrong.is_empty(), "{} of {laws} laws:\n{}", wrong.len(), wrong.join("\n"));
}

#[test]
fn a_kernel_of_another_formula_is_seen() {
    let law = checked().find(|law| law.formula.text == "GD2 / 4").expect("a law of the crate");
    let kernel: fn(&[f64]) -> f64 = |x| x[0] / 4.0 * (1.0 + 1e-6);
    let wrong = Checked { formula: law.formula, domain: law.domain, kernel };
    assert!(differs(&wrong, &mut Chance(1)).is_some());
    assert!(differs(law, &mut Chance(1)).is_none());
}
