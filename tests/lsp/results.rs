//! What a panel beside the text asks for.

use serde_json::{Value, json};

use crate::client::Client;
use crate::support;

const URI: &str = "untitled:hoist.shaft";

fn asked(client: &mut Client, line: usize, more: Value) -> Value {
    let mut params = json!({ "textDocument": { "uri": URI }, "position": { "line": line, "character": 2 } });
    for (name, value) in more.as_object().expect("an object") {
        params[name] = value.clone();
    }
    let answer = client.ask("layshaft/results", params);
    assert!(answer.get("error").is_none(), "{answer}");
    answer["result"].clone()
}

#[test]
fn the_drive_under_the_cursor_with_curves_numbers_and_verdicts() {
    let text = support::text("specs/mill-hoist.shaft");
    let line = |start: &str| text.lines().position(|line| line.starts_with(start)).expect("such a line");
    let mut client = Client::with(json!({}));
    client.open(URI, &text);
    let found = asked(&mut client, line("drive "), json!({}));
    assert_eq!((&found["schema"], &found["version"]), (&json!("results/1"), &json!(1)));
    assert_eq!((&found["drive"]["name"], &found["drive"]["underCursor"]), (&json!("lift"), &json!(true)));
    let stations = found["stations"].as_array().expect("stations");
    assert_eq!(stations[found["station"].as_u64().expect("one is chosen") as usize]["part"], "motor");
    let chart = &found["chart"];
    assert_eq!((&chart["speed"]["unit"], &chart["effort"]["unit"]), (&json!("rpm"), &json!("N·m")));
    assert!(chart["available"].as_array().is_some_and(|line| line.len() > 50), "{chart}");
    let points = chart["points"].as_array().expect("points");
    let reached = points.iter().find(|point| point["reached"] == true).expect("one is reached");
    // By hand, beside the spec: 1447.1 rpm, 23.55 N·m.
    assert!(reached["speed"]["value"].as_f64().is_some_and(|rpm| (rpm - 1447.1).abs() < 1.0), "{reached}");
    assert!(reached["effort"]["value"].as_f64().is_some_and(|nm| (nm - 23.55).abs() < 0.1), "{reached}");
    assert!(chart["continuous"]["si"].as_f64().is_some(), "{chart}");
    let own = &found["results"][0];
    assert_eq!(own["part"], "");
    let speed = own["rows"].as_array().and_then(|rows| rows.iter().find(|row| row["name"] == "speed"));
    assert!(speed.is_some_and(|row| row["value"]["unit"] == "m/min"), "{own}");
    assert!(found["criteria"][0]["here"][0]["margin"]["shown"].is_string(), "{}", found["criteria"]);
    let corner = asked(&mut client, line("case "), json!({ "station": "reducer" }));
    assert_eq!(corner["stations"][corner["station"].as_u64().expect("chosen") as usize]["part"], "reducer");
    let case = &corner["cases"][corner["case"].as_u64().expect("chosen") as usize];
    assert!(case["label"].as_str().is_some_and(|label| label.contains('[')), "{case}");
    client.finish();
}

#[test]
fn nothing_to_show_and_not_open() {
    let mut client = Client::with(json!({}));
    client.open(URI, "let a = 5 m\n");
    assert_eq!(asked(&mut client, 0, json!({})), Value::Null);
    let params =
        json!({ "textDocument": { "uri": "untitled:x" }, "position": { "line": 0, "character": 0 } });
    assert_eq!(client.ask("layshaft/results", params)["error"]["code"], -32602);
    client.finish();
}
