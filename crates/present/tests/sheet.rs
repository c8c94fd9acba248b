//! The sheet of whole specs: what a reader is shown of drives, criteria and the record.

use std::sync::Arc;

use layshaft_present::sheet::{Detail, DriveRow, Entry, Sheet, sheet};
use layshaft_semantics::analysis::Verdict;
use layshaft_semantics::{NoFiles, analyze};

fn of(text: &str) -> Sheet {
    sheet(&analyze("a.shaft", Arc::from(text), &NoFiles), Detail::Everything)
}

/// 10 N·m at rest, 1200 rpm without load; 5 N·m at the load: 600 rpm, 314.2 W of 314.2 W.
const LINE: &str = "source motor: straight_line { stall_torque = 10 N·m; no_load_speed = 1200 rpm }\n\
                    load fan: constant { torque = 5 N·m }\n\
                    drive run = motor -> fan { direction = forward }\n";

fn with(more: &str) -> Sheet {
    of(&format!("{LINE}{more}"))
}

fn row<'s>(sheet: &'s Sheet, label: &str) -> &'s DriveRow {
    sheet.drives[0].rows.iter().find(|row| row.label == label).expect("the case")
}

#[test]
fn every_case_is_a_row_in_one_unit_a_column() {
    let sheet = with(
        "case slow { motor.no_load_speed = 12 rpm; motor.stall_torque = 6 N·m }\ncase stuck { fan.torque = 11 N·m }\n",
    );
    assert_eq!(sheet.drives[0].chain, "motor -> fan");
    let (plain, slow, stuck) = (row(&sheet, "plain"), row(&sheet, "slow"), row(&sheet, "stuck"));
    assert_eq!((plain.outcome.as_str(), plain.moves), ("runs up", true));
    let source = &plain.sources[0];
    let texts =
        [&plain.speed, &source.speed, &source.effort, &source.power, &source.peak_power, &source.power_share];
    // By hand: 600 rpm, 5 N·m · 62.83 rad/s.
    assert_eq!(
        texts.map(Entry::text),
        ["600.0 rpm", "600.0 rpm", "5.000 N·m", "314.2 W", "314.2 W", "100 %"]
    );
    // By hand: 12 rpm (1 − 5/6) = 2 rpm; 1.047 W of 6/2 N·m · 6 rpm = 1.885 W.
    let source = &slow.sources[0];
    assert_eq!(
        [&slow.speed, &source.power, &source.power_share].map(Entry::text),
        ["2.000 rpm", "1.047 W", "55.6 %"]
    );
    assert_eq!((stuck.outcome.as_str(), stuck.moves), ("stalls", false));
}

#[test]
fn a_criterion_names_required_found_margin_and_governing_case() {
    let sheet = with(
        "case heavy { fan.torque = 6 N·m }\n\
         require \"A-1 speed\" 450 rpm <= run.speed <= 700 rpm\n\
         require \"A-2 power\" run.motor.power <= 0.3 kW\n\
         require \"A-3 goes\" run.starts\n",
    );
    let line = &sheet.criteria[0];
    let governing = &line.outcomes[line.governing.expect("a governing case")];
    assert_eq!(line.required, "450 rpm .. 700 rpm");
    // By hand: heavy runs at 480 rpm: (480 − 450)/450; plain at 600 rpm: (700 − 600)/700.
    assert_eq!(
        (governing.label.as_str(), governing.found.as_ref().map(|f| f.text())),
        ("heavy", Some("480.0 rpm"))
    );
    assert_eq!(governing.margin.as_ref().map(|m| m.text.as_str()), Some("6.67 %"));
    let line = &sheet.criteria[1];
    let governing = &line.outcomes[line.governing.expect("a governing case")];
    assert_eq!((line.verdict, line.failing), (Verdict::Fails, 2));
    assert_eq!(line.required, "at most 0.3 kW");
    assert_eq!(
        (governing.label.as_str(), governing.found.as_ref().map(|f| f.text())),
        ("plain", Some("0.3142 kW"))
    );
    assert_eq!(governing.margin.as_ref().map(|m| m.text.as_str()), Some("-4.72 %"));
    assert_eq!(sheet.criteria[2].required, "run.starts");
    assert_eq!(row(&sheet, "plain").governs, ["A-2 power", "A-3 goes"]);
    assert_eq!(row(&sheet, "heavy").governs, ["A-1 speed"]);
}

#[test]
fn the_author_s_unit_of_speed_is_used_throughout() {
    let sheet = with("require \"A-1\" run.speed >= 9 rev/s\n");
    assert_eq!(row(&sheet, "plain").speed.text(), "10.00 rev/s");
    assert_eq!(sheet.criteria[0].outcomes[0].found.as_ref().map(|f| f.text()), Some("10.00 rev/s"));
}

#[test]
fn the_record_lists_basis_assumptions_laws_and_cautions() {
    let sheet = with(
        "let a = 1250 kg  from \"order 7\"\n\
         let b = 12 N·m ± 0.5 N·m  assumed \"like the last\"\n\
         let c = 20 °C ± 5 K  measured \"hall\"\n\
         let d = 74 % ± 4 points\n",
    );
    let shown = |name: &str| {
        let line = sheet.values.iter().find(|line| line.name == name).expect("the value");
        line.value.as_ref().map(|value| value.text().to_string()).unwrap_or_default()
    };
    assert_eq!(
        ["a", "b", "c", "d"].map(shown),
        ["1250 kg", "12 ± 0.5 N·m", "20 °C ± 5 K", "74 % ± 4 points"]
    );
    assert!(
        sheet.without_basis.iter().any(|name| name == "d")
            && !sheet.without_basis.iter().any(|name| name == "a")
    );
    assert!(
        sheet
            .assumptions
            .iter()
            .any(|line| line.subject == "b" && !line.by_tool && line.reason == "like the last")
    );
    assert!(sheet.laws.iter().any(|law| law.kind == "straight_line" && law.revision >= 1));
    assert!(sheet.cautions.iter().any(|caution| caution.contains("licensed engineer")));
    assert!(of("let a = 1 kg\n").cautions.is_empty(), "no drive, no caution");
}

#[test]
fn a_load_that_can_fall_has_its_caution() {
    let sheet = of(
        "source motor: straight_line { stall_torque = 10 N·m; no_load_speed = 1200 rpm; braking = as_generator }\n\
                    transmission rope: drum { pitch_diameter = 100 mm; layers = 1; efficiency = 95 %; efficiency_backward = 95 % }\n\
                    load hook: hoist { mass = 10 kg }\n\
                    drive lift = motor -> rope -> hook { direction = forward }\n",
    );
    assert!(
        sheet.cautions.first().is_some_and(|caution| caution.contains("local lifting codes")),
        "{:?}",
        sheet.cautions
    );
}

#[test]
fn a_drive_that_cannot_be_solved_says_so() {
    let sheet = of("source motor: straight_line { stall_torque = 10 furlong; no_load_speed = 1200 rpm }\n\
                    load fan: constant { torque = 5 N·m }\n\
                    drive run = motor -> fan\n\
                    require \"A-1\" run.speed >= 9 rpm\n");
    let row = &sheet.drives[0].rows[0];
    assert!(!row.solved && row.sources.is_empty() && row.points.is_empty());
    assert_eq!(
        (sheet.verdict, sheet.criteria[0].required.as_str()),
        (Some(Verdict::NotJudged), "run.speed >= 9 rpm")
    );
}

#[test]
fn everything_that_can_be_asked_is_there_in_full() {
    let sheet = with("");
    let results = &row(&sheet, "plain").results;
    let find = |part: &str, name: &str| {
        let of = results.iter().find(|results| results.part == part).expect("the part");
        of.results.iter().find(|(of, _)| *of == name).map(|(_, entry)| entry.text().to_string())
    };
    assert_eq!(find("", "peak_power").as_deref(), Some("314.2 W"));
    assert_eq!(find("motor", "torque").as_deref(), Some("5.000 N·m"));
    assert_eq!(find("fan", "speed").as_deref(), Some("600.0 rpm"));
    let brief = sheet_of_tables();
    assert!(row(&brief, "plain").results.is_empty(), "tables do not pay for it");
}

fn sheet_of_tables() -> Sheet {
    sheet(&analyze("a.shaft", Arc::from(LINE), &NoFiles), Detail::Tables)
}
