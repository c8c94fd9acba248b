//! "Did you mean": the known word nearest to a mistyped one.

/// Longest word that is compared; anything longer is no slip of the fingers.
const LONGEST: usize = 64;

/// The word of `among` that `word` was most likely meant to be, or `None` if none is near.
///
/// Near means: the same but for upper and lower case, or at most one slip (a letter wrong, missing, added, or
/// two neighbours swapped) per three letters, at least one for words of two letters or more. The first of
/// equally near words wins, so the order of `among` decides.
pub fn closest<'a>(word: &str, among: impl Iterator<Item = &'a str>) -> Option<&'a str> {
    let typed: Vec<char> = word.chars().flat_map(char::to_lowercase).take(LONGEST + 1).collect();
    if typed.len() > LONGEST {
        return None;
    }
    let mut best: Option<(usize, &'a str)> = None;
    let mut letters: Vec<char> = Vec::new();
    let mut rows = [Vec::new(), Vec::new(), Vec::new()];
    for candidate in among {
        letters.clear();
        letters.extend(candidate.chars().flat_map(char::to_lowercase).take(LONGEST + 1));
        let shorter = typed.len().min(letters.len());
        let limit = if shorter < 2 { 0 } else { (typed.len().max(letters.len()) / 3).max(1) };
        if typed.len().abs_diff(letters.len()) > limit {
            continue;
        }
        // Doubled, so that a word that differs in case alone stands between equal and one slip.
        let distance = 2 * slips(&typed, &letters, &mut rows) + usize::from(candidate != word);
        if distance <= 2 * limit + 1 && best.is_none_or(|(least, _)| distance < least) {
            best = Some((distance, candidate));
        }
    }
    best.map(|(_, candidate)| candidate)
}

/// Damerau–Levenshtein distance in its restricted form (optimal string alignment). The rows are scratch space.
fn slips(a: &[char], b: &[char], rows: &mut [Vec<usize>; 3]) -> usize {
    let [before, above, row] = rows;
    above.clear();
    above.extend(0..=b.len());
    for (i, &x) in a.iter().enumerate() {
        row.clear();
        row.push(i + 1);
        for (j, &y) in b.iter().enumerate() {
            let mut least = (above[j] + usize::from(x != y)).min(above[j + 1] + 1).min(row[j] + 1);
            if i > 0 && j > 0 && x == b[j - 1] && a[i - 1] == y {
                least = least.min(before[j - 1] + 1);
            }
            row.push(least);
        }
        std::mem::swap(before, above);
        std::mem::swap(above, row);
    }
    above[b.len()]
}

#[cfg(test)]
mod tests {
    use super::closest;

    fn among(word: &str) -> Option<&'static str> {
        closest(word, ["torque", "rated_torque", "speed", "rpm", "m"].into_iter())
    }

    #[test]
    fn finds_the_slip_of_the_fingers() {
        assert_eq!(among("torqeu"), Some("torque"));
        assert_eq!(among("rated_torqe"), Some("rated_torque"));
        assert_eq!(among("Torque"), Some("torque"));
        assert_eq!(among("sped"), Some("speed"));
        assert_eq!(among("rmp"), Some("rpm"));
    }

    #[test]
    fn keeps_quiet_where_nothing_is_near() {
        assert_eq!(among("inertia"), None);
        assert_eq!(among("x"), None);
        assert_eq!(among(""), None);
        assert_eq!(among(&"torque".repeat(100)), None);
        assert_eq!(among("M"), Some("m"));
    }
}
