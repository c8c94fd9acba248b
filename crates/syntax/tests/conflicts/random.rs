//! Random sentences of a grammar, written as specs.

use std::collections::BTreeMap;

use crate::ebnf::Grammar;

/// Derives sentences.
pub struct Deriver<'g> {
    rules: BTreeMap<&'g str, Vec<&'g [String]>>,
    /// The least number of levels below each rule.
    heights: BTreeMap<&'g str, usize>,
}

impl<'g> Deriver<'g> {
    /// Prepares a grammar.
    pub fn new(grammar: &'g Grammar) -> Self {
        let mut rules: BTreeMap<&str, Vec<&[String]>> = BTreeMap::new();
        for (left, right) in &grammar.productions {
            rules.entry(left).or_default().push(right);
        }
        let mut heights: BTreeMap<&str, usize> = BTreeMap::new();
        loop {
            let before = heights.len();
            let round: Vec<_> = rules
                .iter()
                .filter(|(left, _)| !heights.contains_key(*left))
                .filter_map(|(left, rights)| {
                    let low = rights.iter().filter_map(|right| height(&rules, &heights, right)).min()?;
                    Some((*left, low + 1))
                })
                .collect();
            heights.extend(round);
            if heights.len() == before {
                break;
            }
        }
        Self { rules, heights }
    }

    /// A sentence of `start`; once it has `length` terminals it is ended as soon as can be.
    pub fn sentence(
        &self,
        start: &str,
        length: usize,
        choices: &mut impl Iterator<Item = u8>,
    ) -> Vec<String> {
        let mut done = Vec::new();
        let mut open = vec![start];
        while let Some(symbol) = open.pop() {
            let Some(rights) = self.rules.get(symbol) else {
                done.push(symbol.to_string());
                continue;
            };
            let flat = |right: &&&[String]| height(&self.rules, &self.heights, right).unwrap_or(usize::MAX);
            let shortest = rights.iter().min_by_key(flat);
            let chosen = match choices.next() {
                Some(choice) if done.len() + open.len() < length => {
                    rights.get(usize::from(choice) % rights.len())
                }
                _ => shortest,
            };
            open.extend(chosen.into_iter().flat_map(|right| right.iter().rev().map(String::as_str)));
        }
        done
    }
}

fn height(
    rules: &BTreeMap<&str, Vec<&[String]>>,
    heights: &BTreeMap<&str, usize>,
    right: &[String],
) -> Option<usize> {
    let of = |symbol: &String| match rules.contains_key(symbol.as_str()) {
        true => heights.get(symbol.as_str()).copied(),
        false => Some(0),
    };
    right.iter().map(of).try_fold(0, |most, height| height.map(|height| most.max(height)))
}

/// Writes a sentence as a spec.
pub fn written(sentence: &[String], choices: &mut impl Iterator<Item = u8>) -> String {
    let mut text = String::new();
    for (index, terminal) in sentence.iter().enumerate() {
        let mut pick = |words: &[&'static str]| words[usize::from(choices.next().unwrap_or(0)) % words.len()];
        let key = sentence.get(index + 1).is_some_and(|next| next == "NAME" || next == "NUMBER")
            && sentence.get(index + 2).is_some_and(|next| next == "\"=\"");
        let word = match terminal.as_str() {
            // Members are a gear's, and a declaring word before one would declare.
            "NAME" if key => "gear",
            "NAME" => pick(&["a", "motor", "x_1", "η", "hill", "plain", "rated_speed", "S", "in_", "load"]),
            // A count of equal parts is whole.
            "NUMBER" if sentence.get(index + 1).is_some_and(|next| next == "\"*\"") => pick(&["2", "12"]),
            "NUMBER" => pick(&["1", "0.5", "1450", "1e3", "2.50"]),
            "NEGATIVE" => pick(&["-1", "-0.25", "−3"]),
            "UNIT" => pick(&["m", "N·m", "%", "kg*m^2", "1/min", "W/(m²·K)", "°C"]),
            "STRING" => pick(&["\"x\"", "\"a; b # c\"", "“y z”"]),
            "SUPERSCRIPT" => pick(&["²", "⁻¹"]),
            "COMPARE" => pick(&["<", "<=", "≤"]),
            "CODE" => pick(&["part-limit", "load-share", "peak-as-continuous"]),
            "RATIO" => pick(&["reduction", "increase"]),
            "TEETH" => "teeth",
            "DUTY" => pick(&["S1", "S3"]),
            "NL" => pick(&["\n", "\n\n", "  # note\n", "\n# note\n", "\r\n"]),
            "\"±\"" => pick(&["±", "+/-"]),
            "\"*\"" => pick(&["*", "×", "·"]),
            other => other.trim_matches('"'),
        };
        text.push_str(if text.is_empty() { "" } else { " " });
        text.push_str(word);
    }
    text
}
