//! Pages of the words that are not of the spec but of the registry: kinds of parts and kinds of quantities.

use layshaft_mechanics::registry::{self, ResultShape, Role};
use layshaft_present::sheet::role_word;

use super::field::{need, wants};
use crate::markup::{self, Page, code};

/// The page of a kind of part: what it is, its fields, results, laws and cautions.
pub(crate) fn part_kind(role: Role, word: &str) -> Option<String> {
    let row = registry::row(role, word)?;
    let mut page = Page::default();
    page.paragraph(format!("**{}** ({}): {}", row.title, role_word(role), code(row.name)));
    page.paragraph(row.summary);
    let fields: Vec<Vec<String>> = row
        .fields
        .iter()
        .chain(registry::common_fields(role))
        .map(|field| {
            let cell = |words: &str| words.replace('|', "\\|");
            let wanted = wants(field);
            let shape = wanted.strip_suffix(&need(field)).unwrap_or(&wanted).trim_end_matches("; ");
            vec![code(field.name), cell(field.meaning), cell(shape), cell(&need(field))]
        })
        .collect();
    page.table(&["field", "meaning", "value", "needed"], &fields);
    let results: Vec<Vec<String>> = row
        .results
        .iter()
        .chain(registry::common_results(role))
        .map(|result| vec![code(result.name), result.meaning.to_owned(), shape(&result.shape)])
        .collect();
    page.table(&["result", "meaning", "kind"], &results);
    let laws: Vec<String> = row
        .formulas
        .iter()
        .map(|law| {
            format!(
                "{} = {}, {} — {}; r{}",
                code(law.name),
                code(law.text),
                law.validity,
                law.source,
                law.revision
            )
        })
        .collect();
    page.list(&laws);
    page.list(&row.cautions.iter().map(|caution| (*caution).to_owned()).collect::<Vec<_>>());
    page.paragraph(format!("```shaft\n{}\n```", row.example));
    Some(page.finish())
}

fn shape(shape: &ResultShape) -> String {
    match shape {
        ResultShape::Quantity(kind) => layshaft_units::kind(kind).map_or(*kind, |kind| kind.title).to_owned(),
        ResultShape::Speed => "speed".to_owned(),
        ResultShape::Effort => "torque or force".to_owned(),
        ResultShape::Way => "angle or length".to_owned(),
        ResultShape::Flag => "yes or no".to_owned(),
        ResultShape::Word(words) => words.iter().map(|word| code(word)).collect::<Vec<_>>().join(", "),
    }
}

/// The page of a kind of quantity: what it is and the units offered for it.
pub(crate) fn quantity_kind(word: &str) -> Option<String> {
    let kind = layshaft_units::kind(word)?;
    let mut page = Page::default();
    page.paragraph(format!("**{}**, a kind of quantity: {}", kind.title, kind.meaning));
    let units: Vec<String> =
        kind.units.iter().filter(|unit| !unit.is_empty()).map(|u| markup::number(u)).collect();
    if !units.is_empty() {
        page.paragraph(format!(
            "Units: {}; kept in {}",
            units.join(", "),
            if kind.si.is_empty() { "plain numbers" } else { kind.si }
        ));
    }
    Some(page.finish())
}
