//! Drawn tests: what is offered at `$0`, the best first.

use super::{Completions, Folders, Listed, NoFolders, Options, completions, documentation};
use crate::fixture::Fixture;

const PLAIN: Options<'_> = Options { snippets: false, by_blank: false, folders: &NoFolders };
const FORMS: Options<'_> = Options { snippets: true, by_blank: false, folders: &NoFolders };
const BLANK: Options<'_> = Options { snippets: false, by_blank: true, folders: &NoFolders };

const FAN: &str =
    "source m: straight_line { stall_torque = 10 N·m; no_load_speed = 3000 rpm; inertia = 0.01 kg·m² }
transmission red: gear { reduction = 2; efficiency = 96 %; efficiency_backward = 94 % }
load fan: quadratic { rated_torque = 14 N·m; rated_speed = 900 rpm }
drive d = m -> red -> fan { direction = forward }
case wet { fan.rated_torque = 15 N·m }
case both { d.direction = each forward, reverse }
let load_torque = 3 N·m
let width = 2 m
";

fn list(drawn: &str, options: Options<'_>) -> Option<Completions> {
    let fixture = Fixture::new(drawn);
    completions(&fixture.snapshot, fixture.file, fixture.offset, options)
}

fn labels(drawn: &str) -> Vec<String> {
    let found = list(drawn, PLAIN);
    found.map_or(Vec::new(), |found| found.items.into_iter().map(|item| item.label).collect())
}

/// The first entries must be these.
fn first(drawn: &str, expected: &[&str]) {
    let found = labels(drawn);
    let most = expected.len().min(found.len());
    assert_eq!(&found[..most], expected, "{drawn}\nof {found:?}");
}

fn in_fan(line: &str) -> String {
    format!("{FAN}{line}")
}

fn holds(drawn: &str, expected: &[&str]) {
    let found = labels(drawn);
    for label in expected {
        assert!(found.iter().any(|known| known == label), "{label} is not in {found:?}\n{drawn}");
    }
}

fn lacks(drawn: &str, unwanted: &[&str]) {
    let found = labels(drawn);
    for label in unwanted {
        assert!(found.iter().all(|known| known != label), "{label} is in {found:?}\n{drawn}");
    }
}

#[test]
fn declarations_where_an_item_begins() {
    first("$0", &["title", "revision", "use", "let", "supply", "source"]);
    first("let a = 5 m\nso$0\nlet b = 2 m\n", &["title"]);
    holds("let a = 5 m\n$0", &["source", "drive", "case", "require", "show", "allow"]);
    lacks("title \"x\"\n$0", &["vary", "determine"]);
    assert_eq!(labels("let a = 5 m # text $0"), Vec::<String>::new());
}

#[test]
fn kinds_of_the_role_alone() {
    holds("source m: $0", &["dc_motor", "induction_motor", "person"]);
    lacks("source m: $0", &["gear", "mains", "vehicle"]);
    first("load w: ve$0", &["constant"]);
    holds("let x: $0", &["torque", "rotational_speed"]);
    let forms = list("source m: $0", FORMS).expect("kinds");
    let whole = forms.items.iter().find(|item| item.label == "straight_line { … }").expect("a form");
    assert!(whole.snippet && whole.text().starts_with("straight_line {"), "{whole:?}");
    let plain = list("source m: $0 { inertia = 1 kg·m² }", FORMS).expect("kinds");
    assert!(plain.items.iter().all(|item| !item.label.contains('{')));
}

#[test]
fn fields_still_missing_with_their_unit() {
    let drawn = "load fan: quadratic { rated_speed = 900 rpm; $0 }";
    first(drawn, &["rated_torque"]);
    lacks(drawn, &["rated_speed"]);
    let found = list(drawn, PLAIN).expect("fields");
    assert_eq!(found.items[0].note, "N·m · one of several");
    assert_eq!(found.items[0].text(), "rated_torque = ");
    let forms = list(drawn, FORMS).expect("fields");
    assert_eq!(forms.items[0].text(), "rated_torque = ${1} N·m");
    let bare = list("load fan: quadratic { rat$0 = 5 N·m; rated_speed = 900 rpm }", PLAIN).expect("fields");
    assert_eq!((bare.items[0].label.as_str(), bare.items[0].text()), ("rated_torque", "rated_torque"));
}

#[test]
fn fields_in_a_block_that_is_still_open() {
    first("load fan: quadratic {\n    rated_speed = 900 rpm\n    $0\n\nlet a = 5 m\n", &["rated_torque"]);
    holds("drive d = m -> fan {\n    $0", &["direction", "set_speed"]);
    holds(&in_fan("source n = m with { $0 }"), &["stall_torque", "inertia"]);
    holds("source m: dc_motor { $0", &["allow"]);
}

#[test]
fn words_of_a_field() {
    first("source m: straight_line { braking = $0 }", &["as_generator", "none"]);
    first("supply s: mains { accepts_return = $0 }", &["yes", "no"]);
    first("drive d = m -> fan { direction = $0 }", &["forward", "reverse"]);
    first("drive d = m -> fan { duty = $0 }", &["S1", "S2", "S3"]);
    first(&in_fan("case c { d.direction = $0 }"), &["forward", "reverse", "each"]);
    first(&in_fan("case c { d.direction = each forward, $0 }"), &["forward", "reverse"]);
    holds(&in_fan("source n = m with { inertia = $0 }"), &["absent"]);
    first("source m: dc_motor { supply = $0 }\nsupply pack: battery { }\nload p: constant { }\n", &["pack"]);
}

#[test]
fn units_that_fit_right_behind_a_number() {
    first("load fan: quadratic { rated_torque = 5 $0 }", &["N·m", "kN·m"]);
    lacks("load fan: quadratic { rated_torque = 5 $0 }", &["rpm", "kW"]);
    first("load fan: quadratic { rated_torque = 5 kN$0 }", &["N·m"]);
    first("load fan: quadratic { rated_torque = 5 N*$0 }", &["N·m"]);
    first("let x: speed = 5 $0", &["m/s"]);
    first(&in_fan("require \"R1\" d.fan.speed >= 5 $0"), &["rpm"]);
    first(&in_fan("require \"R1\" 5 m/min <= d.speed <= 17 $0"), &["rpm"]);
    first(&in_fan("case c { fan.rated_torque = 5 $0 }"), &["N·m"]);
    first(&in_fan("show d.fan.torque as $0"), &["N·m"]);
    first(&in_fan("show d.fan.torque as kN*$0"), &["N·m"]);
    first(&in_fan("require \"R1\" d.speed >= 5 rpm at d.speed = 5 $0"), &["rpm"]);
    first("source m: measured_curve { curve = points (speed [$0]", &["rpm"]);
    holds("let x = 2 * 5 $0", &["N·m", "kW", "mm"]);
    assert_eq!(labels("load fan: quadratic { rated_torque = 5$0 }"), Vec::<String>::new());
    assert_eq!(labels("load fan: quadratic { rated_torque = 5.$0 }"), Vec::<String>::new());
}

#[test]
fn units_of_a_point_by_their_place() {
    first("source m: dc_motor { point = (1.2 $0", &["N·m"]);
    lacks("source m: dc_motor { point = (1.2 $0", &["rpm"]);
    first("source m: dc_motor { point = (1.2 N·m at 2850 $0", &["rpm"]);
    first("source m: dc_motor { point = (1.2 N·m at 2850 rpm, 13 $0), (", &["N·m", "A"]);
    first("source m: straight_line { point = 5.6 kW at 980 $0", &["rpm"]);
}

#[test]
fn thousands_of_names() {
    let many: String = (0..3000).map(|n| format!("let x_{n} = {n} m\nlet t_{n} = {n} N·m\n")).collect();
    let all = list(&format!("{many}let a = $0"), PLAIN).expect("a list");
    assert!(all.items.len() == 100 && all.incomplete);
    let torques = list(&format!("{many}let a: torque = $0"), PLAIN).expect("a list");
    assert!(torques.items[..95].iter().all(|item| item.label.starts_with("t_")));
    let one = list(&format!("{many}let a = X_2999$0"), PLAIN).expect("a list");
    assert_eq!(one.items[0].label, "x_2999");
    assert!(one.incomplete, "other letters ask anew");
}

#[test]
fn what_an_entry_replaces() {
    let fixture = Fixture::new("load fan: quadratic { rated_torque = 5 N*$0m }");
    let found = completions(&fixture.snapshot, fixture.file, fixture.offset, PLAIN).expect("units");
    let replaced = |span: layshaft_diagnostics::Span| {
        fixture.snapshot.text(layshaft_diagnostics::FileSpan { file: fixture.file, span }).to_owned()
    };
    assert_eq!((replaced(found.insert).as_str(), replaced(found.replace).as_str()), ("N*", "N*m"));
    assert_eq!(found.items[0].filter.as_deref(), Some("N*m"));
}

#[test]
fn names_where_an_expression_wants_one() {
    first(&in_fan("load p: constant { torque = $0 }"), &["load_torque"]);
    first(&in_fan("load p: constant { torque = 2 N·m + $0 }"), &["load_torque"]);
    first(&in_fan("let x: length = $0"), &["width"]);
    first(&in_fan("require \"R1\" $0"), &["d"]);
    first(&in_fan("require \"R1\" d.fan.torque <= $0"), &["d", "load_torque"]);
    holds(&in_fan("let x = sqrt($0"), &["width", "m", "min", "pi"]);
    lacks(&in_fan("let x$0 = width"), &["width"]);
}

#[test]
fn results_behind_a_point() {
    let drive = in_fan("require \"R1\" d.$0");
    holds(&drive, &["speed", "starts", "run_up_reserve", "m", "red", "fan", "direction"]);
    let part = in_fan("require \"R1\" d.red.$0");
    holds(&part, &["torque", "speed", "power", "input", "output"]);
    lacks(&part, &["force"]);
    first(&in_fan("require \"R1\" d.fan.t$0 >= 5 N·m"), &["speed", "torque"]);
    first(&in_fan("require \"R1\" 5 N·m <= d.fan.$0"), &["torque"]);
    first(&in_fan("let x = fan.$0"), &["rated_torque", "rated_speed"]);
    first(
        "use \"p.shaft\" as p\nlet x = p.$0\n--- p.shaft\nlet w = 1 m\nload q: constant { torque = 1 N·m }\n",
        &["q", "w"],
    );
}

#[test]
fn chains_and_cases() {
    first(&in_fan("drive e = $0"), &["m"]);
    first(&in_fan("drive e = m -> $0"), &["fan", "red"]);
    lacks(&in_fan("drive e = m -> $0"), &["d", "width"]);
    first(&in_fan("source n = $0"), &["m"]);
    first(&in_fan("require \"R1\" d.starts only in $0"), &["both", "wet", "plain"]);
    first(&in_fan("require \"R1\" d.starts not in wet, $0"), &["both", "wet", "plain"]);
    first(&in_fan("require \"R1\" d.starts only in both[$0"), &["forward", "reverse"]);
    first(&in_fan("case c = $0"), &["both", "wet"]);
    first(&in_fan("case c { $0 }"), &["d", "fan", "m", "red"]);
    first(&in_fan("case c { fan.$0 }"), &["rated_torque", "rated_speed"]);
    first(&in_fan("case c { d.$0 }"), &["direction", "gear"]);
}

#[test]
fn words_that_may_follow() {
    first(&in_fan("require \"R1\" d.starts $0"), &["only in", "not in", "only where"]);
    first(&in_fan("require \"R1\" d.starts only $0"), &["in", "where"]);
    first(&in_fan("require \"R1\" d.starts only where d.direction = $0"), &["forward", "reverse"]);
    holds("let a = 5 kg $0", &["from", "measured", "assumed"]);
    first("let a = (5 kg) $0", &["from", "measured", "assumed"]);
    holds("allow $0", &["peak-as-continuous", "implausible"]);
    lacks("allow $0", &["kind-mismatch"]);
    holds("allow peak-as$0", &["peak-as-continuous"]);
    first("allow peak-as-continuous $0", &["because"]);
    first("use \"a.shaft\" $0", &["as"]);
    first("transmission c: chain { teeth = 42 $0 }", &["drives"]);
    holds("source m: measured_curve { curve = points ($0", &["speed [rpm]", "torque [N·m]"]);
}

struct Disk;

impl Folders for Disk {
    fn list(&self, folder: &str) -> Vec<Listed> {
        let one = |name: &str, folder| Listed { name: name.to_owned(), folder };
        match folder {
            "" => {
                vec![one("parts", true), one("spec.shaft", false), one("d4.csv", false), one("x.pdf", false)]
            }
            "parts" => vec![one("motors.shaft", false)],
            _ => Vec::new(),
        }
    }
}

#[test]
fn files_between_quotes() {
    let names = |drawn: &str| {
        let options = Options { folders: &Disk, ..PLAIN };
        let found = list(drawn, options);
        found.map_or(Vec::new(), |found| found.items.into_iter().map(|item| item.label).collect::<Vec<_>>())
    };
    assert_eq!(names("use \"$0\""), ["parts"]);
    assert_eq!(names("use \"parts/mo$0"), ["motors.shaft"]);
    assert_eq!(names("let c = csv \"$0\" (n as speed [rpm])"), ["d4.csv", "parts"]);
    assert_eq!(names("use \"../$0\""), Vec::<String>::new());
    assert_eq!(names("title \"$0\""), Vec::<String>::new());
}

#[test]
fn a_blank_shows_only_small_choices() {
    assert!(list("load fan: quadratic { rated_torque = 5 $0", BLANK).is_some());
    assert!(list("source m: $0", BLANK).is_some());
    assert!(list("let a = $0", BLANK).is_none());
    assert!(list("let a = 5 $0", BLANK).is_none());
    assert!(list(&in_fan("require \"R1\" d.starts $0"), BLANK).is_none());
}

#[test]
fn every_entry_can_be_told_of() {
    let fixture = Fixture::new(&in_fan("require \"R1\" d.fan.torque <= $0"));
    for drawn in ["$0", "source m: $0", "let x: $0", "allow $0", "let a = 5 $0", "load f: quadratic { $0"] {
        for item in list(drawn, PLAIN).expect("a list").items {
            let told = documentation(&Fixture::new(drawn).snapshot, &item.subject);
            assert!(item.subject.is_empty() || told.is_some(), "{item:?}");
        }
    }
    let found = completions(&fixture.snapshot, fixture.file, fixture.offset, PLAIN).expect("a list");
    let value = found.items.iter().find(|item| item.label == "load_torque").expect("a value");
    let told = documentation(&fixture.snapshot, &value.subject).expect("told");
    assert_eq!(told.detail.as_deref(), Some("3 N·m"));
    let other = Fixture::new(&in_fan("").replace("load_torque", "loose_torque"));
    assert_eq!(documentation(&other.snapshot, &value.subject), None);
    for drawn in ["require \"R1\" d.fan.$0", "require \"R1\" d.$0"] {
        let fixture = Fixture::new(&in_fan(drawn));
        let found = completions(&fixture.snapshot, fixture.file, fixture.offset, PLAIN).expect("results");
        let speed = found.items.iter().find(|item| item.label == "speed").expect("a speed");
        let told = documentation(&fixture.snapshot, &speed.subject).expect("told");
        assert!(told.markdown.contains("rpm"), "{}", told.markdown);
    }
    assert!(told.markdown.contains("torque"), "{}", told.markdown);
}
