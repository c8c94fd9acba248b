//! What can begin a value, or stand behind an operator in it.

use layshaft_mechanics::registry::Shape;
use layshaft_present::unit::kind_of;
use layshaft_semantics::analysis::ValueRecord;
use layshaft_semantics::quantity::Datum;
use layshaft_units::{Function, Type, demand};

use super::Asked;
use super::menu::{CompletionKind, Menu};
use super::names::{about, of_own_item};
use super::place::Flavor;
use super::wanted::Wanted;
use super::words::words;
use crate::names::{Declared, Named};

/// Adds what fits: words of the field first, then names by how well they fit, then functions.
pub(super) fn operands(
    asked: Asked<'_, '_>,
    wanted: &Wanted,
    flavor: Flavor,
    first: bool,
    menu: &mut Menu<'_>,
) {
    let closed = of_shape(asked, wanted, first, menu) || !wanted.words.is_empty();
    for word in wanted.words {
        menu.add(0, CompletionKind::Word, word);
    }
    if wanted.flag {
        yes_and_no(menu);
    }
    if first && flavor == Flavor::Case {
        words(&["each"], 3, menu);
    }
    if first && flavor == (Flavor::Field { variant: true }) {
        let entry = menu.add(4, CompletionKind::Keyword, "absent");
        entry.note("takes the field away in this variant").about("word:absent");
    }
    if closed {
        return;
    }
    names(asked, wanted, flavor, menu);
    for function in Function::all() {
        let snippets = menu.snippets;
        let entry = menu.add(6, CompletionKind::Function, function.name());
        entry.note(function.meaning()).about(format!("function:{}", function.name()));
        if snippets {
            entry.form(format!("{}($1)", function.name()));
        } else {
            entry.insert(format!("{}(", function.name()));
        }
    }
    for constant in ["pi", "standard_gravity"] {
        menu.add(6, CompletionKind::Constant, constant)
            .note("constant")
            .about(format!("constant:{constant}"));
    }
    logic(flavor, first && wanted.kinds.is_empty(), menu);
}

/// The words that a condition, a choice between two values and a table begin with.
fn logic(flavor: Flavor, first: bool, menu: &mut Menu<'_>) {
    let form = menu.snippets;
    let entry = menu.add(7, CompletionKind::Keyword, "if");
    entry.note("chooses between two values").about("word:if");
    if form {
        entry.form("if $1 then $2 else $3");
    } else {
        entry.insert("if ");
    }
    if matches!(flavor, Flavor::Require | Flavor::Show | Flavor::Let) {
        words(&["not"], 7, menu);
    }
    if flavor == Flavor::Let && first {
        tables(6, menu);
    }
}

/// What the shape of a field says by words; whether nothing else fits.
fn of_shape(asked: Asked<'_, '_>, wanted: &Wanted, first: bool, menu: &mut Menu<'_>) -> bool {
    let Some(field) = wanted.field else { return false };
    match field.shape {
        Shape::Choice(choices) => {
            for (word, meaning) in choices {
                menu.add(0, CompletionKind::Word, word).note(*meaning);
            }
            true
        }
        Shape::Flag => {
            // A flag may follow a condition, but nearly always it is one of the words.
            false
        }
        Shape::Part(role) => {
            super::names::parts(asked, Some(role), menu);
            true
        }
        Shape::Duty => {
            for (word, meaning) in DUTIES {
                menu.add(0, CompletionKind::Word, word).note(*meaning);
            }
            true
        }
        Shape::Gears => {
            gears(asked, menu);
            true
        }
        Shape::OfRated(_) => {
            let entry = menu.add(2, CompletionKind::Keyword, "rated");
            entry.note("the rated value: `2.3 × rated`").about("word:rated");
            false
        }
        Shape::Points(_) if first => {
            tables(1, menu);
            false
        }
        _ => false,
    }
}

fn yes_and_no(menu: &mut Menu<'_>) {
    menu.add(0, CompletionKind::Word, "yes").note("the flag is set");
    menu.add(0, CompletionKind::Word, "no").note("the flag is not set");
}

fn tables(rank: u8, menu: &mut Menu<'_>) {
    let form = menu.snippets;
    let points = menu.add(rank, CompletionKind::Keyword, "points");
    points.note("a table in the text").about("word:points");
    points.insert(if form { "points ($1) {\n    $0\n}" } else { "points (" });
    points.snippet = form;
    let csv = menu.add(rank, CompletionKind::Keyword, "csv");
    csv.note("a table in a file").about("word:csv");
    csv.insert(if form { "csv \"$1\"" } else { "csv \"" });
    csv.snippet = form;
}

/// Duty types of IEC 60034-1.
const DUTIES: &[(&str, &str)] = &[
    ("S1", "continuous running"),
    ("S2", "short time: `S2 30 min`"),
    ("S3", "intermittent periodic: `S3 40 %`"),
    ("S4", "intermittent periodic with starting: `S4 40 %`"),
    ("S5", "intermittent periodic with electric braking: `S5 40 %`"),
    ("S6", "continuous operation with intermittent load: `S6 40 %`"),
    ("S7", "continuous operation with starting and electric braking"),
    ("S8", "continuous operation with related changes of load and speed"),
    ("S9", "load and speed change without a period"),
    ("S10", "discrete constant loads"),
];

/// The ways to say a ratio, and the gears that gearboxes of the spec name.
fn gears(asked: Asked<'_, '_>, menu: &mut Menu<'_>) {
    let own = asked.snapshot.analysis.parts.iter().flat_map(|part| &part.fields);
    let mut names: Vec<&str> = own.filter_map(|field| field.name.strip_prefix("gear ")).collect();
    names.sort_unstable();
    names.dedup();
    for name in names {
        menu.add(0, CompletionKind::Word, name).note("gear");
    }
    for word in ["reduction", "increase", "teeth"] {
        words(&[word], 1, menu);
    }
}

/// Names of values, parts, drives and files, those of a fitting kind first.
fn names(asked: Asked<'_, '_>, wanted: &Wanted, flavor: Flavor, menu: &mut Menu<'_>) {
    let asks = matches!(flavor, Flavor::Require | Flavor::Show | Flavor::Asked);
    let rows: Vec<_> = wanted.rows().collect();
    let own = |named: Named| flavor == Flavor::Let && of_own_item(asked, named);
    let rank = |_: &str, named: Named| match named.what {
        Declared::Value if own(named) => None,
        Declared::Value if wanted.kinds.is_empty() => Some(2),
        Declared::Value => {
            let ty = named.value(asked.snapshot).and_then(kind_known);
            Some(match ty.map(|ty| rows.iter().any(|row| demand(ty, row).is_ok())) {
                Some(true) => 1,
                None => 2,
                Some(false) => 5,
            })
        }
        Declared::Part(_) => Some(4),
        Declared::Drive => Some(if asks { 0 } else { 5 }),
        Declared::File(_) => Some(5),
        Declared::Case => None,
    };
    for (rank, text, named) in menu.best(asked.snapshot.names().all(asked.file), rank) {
        if named.what == Declared::Value {
            let ty = named.value(asked.snapshot).and_then(kind_known);
            let note = ty.and_then(kind_of).map_or("value", |kind| kind.title);
            menu.add(rank, CompletionKind::Value, text).note(note).about(about(asked, named));
        } else {
            super::names::name(asked, text, named, rank, menu);
        }
    }
}

fn kind_known(record: &ValueRecord) -> Option<&Type> {
    match record.value.as_ref()? {
        Datum::Quantity(quantity) => Some(&quantity.ty),
        _ => None,
    }
}
