//! Drawn tests of the panel's data.

use layshaft_present::sheet::Entry;
use layshaft_semantics::analysis::Verdict;

use super::{Query, Results, results};
use crate::fixture::Fixture;

const SPEC: &str = "title \"t\"
source m: straight_line { stall_torque = 10 N·m; no_load_speed = 3000 rpm }
load fan: quadratic { rated_torque = 5 N·m; rated_speed = 1500 rpm }
load big: quadratic { rated_torque = 10 N·m; rated_speed = 1500 rpm }
drive one = m -> fan
drive two = m -> big
case weak { m.stall_torque = each 6 N·m, 8 N·m }
require \"R1 quick\" two.speed >= 1200 rpm
";

fn at(drawn: &str, query: Query<'_>) -> Results {
    let fixture = Fixture::new(drawn);
    results(&fixture.snapshot, fixture.file, fixture.offset, query).expect("there are drives")
}

fn chosen(found: &Results) -> (&str, &str, &str, bool) {
    let station = found.station.map_or("", |at| found.stations[at].part.as_str());
    (&found.drive, &found.cases[found.case].label, station, found.under_cursor)
}

#[test]
fn the_cursor_chooses_drive_case_and_station() {
    let check = |from: &str, to: &str, expected| {
        let found = at(&SPEC.replacen(from, to, 1), Query::default());
        assert_eq!(chosen(&found), expected, "{to}");
    };
    check("title", "ti$0tle", ("one", "plain", "m", false));
    check("drive two", "drive t$0wo", ("two", "plain", "m", true));
    check("load big", "load b$0ig", ("two", "plain", "big", true));
    check("10 N·m; rated", "10 $0N·m; rated", ("two", "plain", "big", true));
    check("case weak", "case we$0ak", ("one", "weak[6 N·m]", "m", true));
    check("R1", "R$01", ("two", "weak[6 N·m]", "m", true));
}

#[test]
fn a_client_may_choose_itself() {
    let query = Query { drive: Some("two"), case: Some("weak[8 N·m]"), gear: None, station: Some("big") };
    let found = at(&SPEC.replace("title", "ti$0tle"), query);
    assert_eq!(chosen(&found), ("two", "weak[8 N·m]", "big", false));
    let wrong = Query { drive: Some("three"), case: Some("none"), gear: None, station: Some("nothing") };
    assert_eq!(chosen(&at(&SPEC.replace("title", "ti$0tle"), wrong)), ("one", "plain", "m", false));
}

#[test]
fn curves_meet_at_the_points_and_the_numbers_are_those_of_the_sheet() {
    let found = at(&SPEC.replace("drive one", "drive o$0ne"), Query::default());
    let chart = found.chart.as_ref().expect("a solved drive");
    assert_eq!((chart.speed.unit.as_str(), chart.effort.unit.as_str()), ("rpm", "N·m"));
    let [point] = chart.points.as_slice() else { panic!("{:?}", chart.points) };
    // Half of the no-load speed: 10 N·m (1 − 1/2) = 5 N·m, what the fan takes there.
    assert!((point.speed.value - 1500.0).abs() < 1e-6 && (point.effort.value - 5.0).abs() < 1e-6);
    assert_eq!((point.stability, point.mode, point.reached), ("stable", "motoring", true));
    let first = chart.available.first().expect("samples");
    assert!(first.0.abs() < 1.0 && (first.1 - 10.0).abs() < 1e-3, "{first:?}");
    assert!(chart.available.windows(2).all(|pair| pair[0].0 <= pair[1].0));
    let speed = found.parts[0].results.iter().find(|row| row.name == "speed").expect("its speed");
    assert!(matches!(&speed.entry, Entry::Number(number) if number.text == "1500 rpm"));
    assert!(!speed.meaning.is_empty());
}

#[test]
fn criteria_with_the_chosen_case_and_the_governing_one() {
    let found = at(&SPEC.replace("drive two", "drive t$0wo"), Query::default());
    let [criterion] = found.criteria.as_slice() else { panic!("one criterion") };
    let here = &criterion.line.outcomes[criterion.here[0]];
    assert_eq!((here.label.as_str(), here.verdict), ("plain", Verdict::Fails));
    let governing = &criterion.line.outcomes[criterion.line.governing.expect("judged")];
    assert_eq!(governing.label, "weak[6 N·m]");
    let verdicts: Vec<_> = found.cases.iter().map(|case| case.verdict).collect();
    assert_eq!(verdicts, [Some(Verdict::Fails); 3]);
}

#[test]
fn without_a_drive_nothing_and_without_a_solution_the_reason() {
    let fixture = Fixture::new("let a$0 = 5 m\n");
    assert_eq!(results(&fixture.snapshot, fixture.file, fixture.offset, Query::default()), None);
    let broken = at(
        "source m: straight_line { stall_torque = 10 N·m }\nload l: quadratic { }\ndrive d$0 = m -> l\n",
        Query::default(),
    );
    assert!(broken.chart.is_none() && broken.no_chart.is_some());
    assert_eq!(broken.cases[0].outcome, "not solved");
}
