//! Drawn tests of what is told about each kind of word.

use layshaft_diagnostics::FileId;

use super::{Options, hover};
use crate::fixture::Fixture;

const FAN: &str =
    "source motor: straight_line { stall_torque = 10 N·m; no_load_speed = 3000 rpm; braking = none }
transmission reducer: gear { reduction = 4; efficiency = 90 % }
load fan: quadratic { rated_torque = 12 N·m; rated_speed = 600 rpm; inertia = 0.1 kg·m² }
drive d = motor -> reducer -> fan { direction = forward }
case weak { motor.stall_torque = each 8 N·m, 9 N·m }
";

fn told(drawn: &str) -> Option<String> {
    told_with(drawn, Options::default())
}

fn told_with(drawn: &str, options: Options) -> Option<String> {
    let fixture = Fixture::new(drawn);
    hover(&fixture.snapshot, fixture.file, fixture.offset, options).map(|hover| hover.markdown)
}

fn has(drawn: &str, wanted: &[&str]) {
    let markdown = told(drawn).unwrap_or_default();
    for words in wanted {
        assert!(markdown.contains(words), "{words:?} is not in:\n{markdown}");
    }
}

#[test]
fn a_value_says_how_it_came_about() {
    has(
        "let load = 1250 kg  from \"order\"\n## With the block.\nlet to$0tal = 1.25 * load + 60 kg\ncase heavy { load = 2000 kg }\n",
        &["**total** = 1622.5 kg (mass)", "1\\.25 × 1250 kg \\+ 60 kg = 1622\\.5 kg", "With the block"],
    );
    has(
        "let lo$0ad = 1250 kg  from \"order\"\ncase heavy { load = 2000 kg }\n",
        &["`from` “order”", "2000 kg in heavy"],
    );
}

#[test]
fn limits_are_spelled() {
    has("let a$0 = 12 N·m ± 5 %\n", &["limits 11.4 N·m .. 12.6 N·m"]);
    has("let a = 1$02 N·m ± 5 %\n", &["**12 N·m**", "limits 11.4 N·m .. 12.6 N·m", "torque"]);
}

#[test]
fn a_literal_in_other_units() {
    has("let p: mechanical_power = 4 k$0W\n", &["**4 kW**", "4000 W", "5.364 hp", "5.438 PS"]);
    has("let v = 3 * 1$05 km/h\n", &["**15 km/h**", "4.167 m/s"]);
    has("let e = 74$0 %\n", &["0.74"]);
    has("let p = 5 h$0p\n", &["3.728 kW", "5.069 PS"]);
}

#[test]
fn a_field_says_what_the_registry_knows() {
    has(
        &FAN.replace("no_load_speed", "no_load$0_speed"),
        &["**motor\\.no\\_load\\_speed** = 3000 rpm", "314.2 rad/s", "one of several", "usual"],
    );
    has(&FAN.replace("stall_torque = 10", "stall$0_torque = 10"), &["8 N·m in weak", "9 N·m in weak"]);
    has(
        &FAN.replace("10 N·m;", "10 N·m ± 5 %;").replace("{ stall_t", "{ stall$0_t"),
        &["written 10 N·m ± 5 %"],
    );
    has(&FAN.replace("direction =", "dire$0ction ="), &["which way the load is to move", "default"]);
}

#[test]
fn a_part_in_every_case() {
    let motor = FAN.replace("source motor", "source mo$0tor");
    has(&motor, &["| plain |", "weak", "of peak", "motoring", "(source)"]);
    assert!(!told(&motor).unwrap_or_default().contains("data:image"));
    let chart = told_with(&motor, Options { charts: true }).unwrap_or_default();
    assert!(chart.contains("](data:image/svg+xml;base64,"), "{chart}");
    has(
        &FAN.replace("transmission reducer", "transmission redu$0cer"),
        &["slower ×4, torque ×4 · 90.0 % = ×3.6", "speed in", "Guard open gears"],
    );
}

#[test]
fn a_drive_and_its_criteria() {
    let spec = FAN.replace("drive d", "drive $0d") + "require \"R1 fast\" d.fan.speed >= 500 rpm\n";
    has(&spec, &["**d** = `motor -> reducer -> fan`", "runs up", "stable", "R1 fast", "governed by weak"]);
}

#[test]
fn a_result_with_its_derivation() {
    let spec = format!("{FAN}require \"R1\" d.motor.tor$0que <= 8 N·m\n");
    has(
        &spec,
        &[
            "**d\\.motor\\.torque**",
            "| plain |",
            "R1: ",
            "How it came about in plain",
            "T0 * (1 - w / w0)",
            "10 N·m",
        ],
    );
}

#[test]
fn a_criterion_by_its_clause() {
    let spec = format!("{FAN}require \"R1 fa$0st\" d.fan.speed >= 500 rpm\n");
    has(&spec, &["**R1 fast**", "required at least 500 rpm", "margin", "| plain |"]);
    has(&spec.replace("$0", "").replace("require", "requ$0ire"), &["**R1 fast**"]);
}

#[test]
fn words_of_the_language() {
    has("let a = 2 * p$0i\n", &["3.14159"]);
    has("let a = sq$0rt(4)\n", &["square root"]);
    has("le$0t a = 5 m\n", &["a named value"]);
    has("let a: tor$0que = 5 N·m\n", &["kind of quantity", "lbf·ft"]);
    has(&FAN.replace("gear {", "ge$0ar {"), &["`reduction`", "```shaft", "field"]);
    has(&FAN.replace("forward", "for$0ward"), &["a hoist lifts"]);
    has(&FAN.replace("case weak", "case we$0ak"), &["2 combinations", "10 N·m"]);
    has("use \"p.shaft\" as p$0\n--- p.shaft\nlet b = 1 m\n", &["p\\.shaft", "Declares b"]);
    has(&format!("{FAN}show d.power as h$0p\n"), &["**hp**, a unit", "745.7 W"]);
    assert_eq!(told("# a let in a com$0ment\nlet a = 5 m\n"), None);
}

/// The worked specs: what the hover of a drive shows is what the command prints, everywhere is told without fault, and
/// no hint is too long.
#[test]
fn the_worked_specs_say_what_the_command_says() {
    let specs = [
        include_str!("../../../../tests/specs/mill-hoist.shaft"),
        include_str!("../../../../tests/specs/bakery-trike.shaft"),
        include_str!("../../../../tests/specs/barge-winch.shaft"),
    ];
    for spec in specs {
        let fixture = Fixture::new(spec);
        let snapshot = &fixture.snapshot;
        let told: Vec<_> = (0..=spec.len() as u32)
            .step_by(3)
            .filter_map(|offset| hover(snapshot, FileId(0), offset, Options { charts: true }))
            .collect();
        assert!(told.len() > spec.len() / 9, "{} of {}", told.len(), spec.len());
        let sheet =
            layshaft_present::sheet::sheet(&snapshot.analysis, layshaft_present::sheet::Detail::Tables);
        for (drive, record) in sheet.drives.iter().zip(&snapshot.analysis.drives) {
            let page = told.iter().find(|hover| hover.place == record.place).map(|hover| &hover.markdown);
            let page = page.map_or("", String::as_str);
            for row in drive.rows.iter().take(super::MOST) {
                for source in &row.sources[..1] {
                    for entry in [&row.speed, &source.speed, &source.effort] {
                        assert!(page.contains(entry.text()), "{} is not in {page}", entry.text());
                    }
                }
            }
        }
        let whole = layshaft_diagnostics::Span::new(0, u32::MAX);
        for hint in crate::hints::hints(snapshot, FileId(0), whole, Default::default()) {
            assert!(hint.text.chars().count() <= crate::hints::LONGEST, "{}", hint.text);
        }
    }
}

/// Whatever a spec says, no link, image or tag of its own comes through.
#[test]
fn nothing_of_the_author_s_becomes_markup() {
    let evil = "![x](http://evil.example/a.png) <img src=x> [y](command:z) www.evil.example `b`";
    let spec = format!(
        "## {evil}\nlet a = 5 kg  from \"{evil}\"\n## {evil}\nsource motor: straight_line {{ stall_torque = 10 N·m; no_load_speed = 3000 rpm }}
load fan: quadratic {{ rated_torque = 12 N·m; rated_speed = 1600 rpm }}
## {evil}\ndrive d = motor -> fan {{ direction = forward }}\nrequire \"{evil}\" d.speed <= 3 rpm\ncase c {{ a = 6 kg }}\n"
    );
    let fixture = Fixture::new(&spec);
    let mut seen = 0;
    for offset in 0..spec.len() as u32 {
        let Some(found) = hover(&fixture.snapshot, FileId(0), offset, Options { charts: true }) else {
            continue;
        };
        seen += 1;
        let drawn = found.markdown.replace("](data:image/svg+xml;base64,", "");
        for bad in ["](", "<img", "http:", "www.", "`b`"] {
            assert!(!drawn.contains(bad), "{bad} at {offset}:\n{}", found.markdown);
        }
    }
    assert!(seen > 100, "{seen}");
}
