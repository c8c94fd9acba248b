//! Trees by the form that `Debug` writes: it holds every field, so a law over it leaves none out.

/// The form without what stands between double quotes: names, texts and units of the spec.
pub fn unquoted(form: &str) -> String {
    let mut out = String::with_capacity(form.len());
    let (mut inside, mut escaped) = (false, false);
    for c in form.chars() {
        if inside {
            inside = escaped || c != '"';
            escaped = c == '\\' && !escaped;
        } else {
            out.push(c);
            inside = c == '"';
        }
    }
    out
}

/// Every span of a form.
pub fn spans(form: &str) -> Vec<(usize, usize)> {
    let mut out = Vec::new();
    for part in unquoted(form).split("Span { start: ").skip(1) {
        let ends = part.split_once(" }").map_or(part, |split| split.0);
        let (start, end) = ends.split_once(", end: ").expect("a span has two ends");
        out.push((start.parse().expect("a number"), end.parse().expect("a number")));
    }
    out
}

/// The form without its spans.
pub fn without_spans(form: &str) -> String {
    let mut parts = form.split("Span { start: ");
    let mut out = String::from(parts.next().unwrap_or_default());
    for part in parts {
        out.push_str("Span");
        out.push_str(part.split_once(" }").map_or("", |split| split.1));
    }
    out
}

/// Fails where two forms differ, and shows the place.
///
/// # Panics
/// They differ.
#[track_caller]
pub fn same(one: &str, other: &str, broken: &str) {
    if one != other {
        let at = one.bytes().zip(other.bytes()).take_while(|(one, other)| one == other).count();
        let around =
            |form: &str| String::from_utf8_lossy(&form.as_bytes()[at.saturating_sub(90)..]).into_owned();
        let short = |form: &str| around(form).chars().take(180).collect::<String>();
        panic!("{broken}:\n… {} …\n… {} …", short(one), short(other));
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn spans_of_a_form_and_not_of_its_texts() {
        let form = r#"Text { value: "\"Span { start: 9, end: 1 }\\", span: Span { start: 3, end: 5 } }"#;
        assert_eq!(spans(form), [(3, 5)]);
        assert_eq!(without_spans("A { span: Span { start: 3, end: 5 }, b: 1 }"), "A { span: Span, b: 1 }");
    }
}
