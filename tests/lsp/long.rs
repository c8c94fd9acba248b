//! Work that takes long: it is told of, and newer text or a cancelled request stops it.

use std::thread::sleep;
use std::time::{Duration, Instant};

use serde_json::{Value, json};

use crate::client::Client;

const URI: &str = "untitled:long.shaft";

/// Some drives in hundreds of cases each.
fn long(drives: u32) -> String {
    let torques: Vec<String> = (0..200).map(|n| format!("{} N·m", 8.0 + f64::from(n) * 0.01)).collect();
    let mut text = String::from(
        "source m: straight_line { stall_torque = 10 N·m; no_load_speed = 3000 rpm; inertia = 0.01 kg·m²; braking = none }\n",
    );
    for n in 0..drives {
        text.push_str(&format!(
            "load f{n}: quadratic {{ rated_torque = {} N·m; rated_speed = 1500 rpm; inertia = 0.2 kg·m² }}\n\
             drive d{n} = m -> f{n} {{ run_up_to = 95 % }}\n\
             require \"R{n} time\" d{n}.run_up_time <= 100 s\n",
            3.0 + 0.01 * f64::from(n)
        ));
    }
    text.push_str(&format!("case all {{ m.stall_torque = each {} }}\n", torques.join(", ")));
    text
}

#[allow(clippy::disallowed_methods, reason = "how long something takes is what is asked")]
fn now() -> Instant {
    Instant::now()
}

fn hover(client: &mut Client) -> i64 {
    let at = json!({ "textDocument": { "uri": URI }, "position": { "line": 0, "character": 8 } });
    client.request("textDocument/hover", at)
}

#[test]
fn long_work_is_told_of_and_stopped_by_newer_text() {
    let mut client = Client::with(json!({ "window": { "workDoneProgress": true } }));
    // As many drives as take this machine about three seconds.
    let begun = now();
    client.open("untitled:short.shaft", &long(1));
    client.published("untitled:short.shaft", 1);
    let drives = (3000 / begun.elapsed().as_millis().max(1)).clamp(2, 400) as u32;
    let before: Vec<String> = client.waiting.iter().map(|message| message["id"].to_string()).collect();
    let begun = now();
    client.open(URI, &long(drives));
    let created = client.wait("a token", |message| {
        message["method"] == "window/workDoneProgress/create" && !before.contains(&message["id"].to_string())
    });
    client.send(&json!({ "jsonrpc": "2.0", "id": created["id"], "result": Value::Null }));
    let token = created["params"]["token"].clone();
    let of = |kind: &'static str| {
        let token = token.clone();
        move |message: &Value| {
            message["method"] == "$/progress"
                && message["params"]["token"] == token
                && message["params"]["value"]["kind"] == kind
        }
    };
    let first = client.wait("its beginning", of("begin"));
    assert_eq!(first["params"]["value"]["title"], "Solving long.shaft");
    client.published(URI, 1);
    client.wait("its end", of("end"));
    let whole = begun.elapsed();
    assert!(whole > Duration::from_millis(300), "{whole:?}: nothing long was tried");

    // The text changes everywhere, so that nothing that was solved helps.
    let change = |client: &mut Client, version, torque: &str| {
        let text = long(drives).replace("0.01 kg·m²", torque);
        client.change(URI, version, json!([{ "text": text }]));
    };
    change(&mut client, 2, "0.011 kg·m²");
    let id = hover(&mut client);
    sleep(whole / 5);
    let begun = now();
    client.change(URI, 3, json!([{ "text": "let a = 4 kg\n" }]));
    let answer = client.answer(id);
    assert_eq!(answer["error"]["code"], -32801, "{answer}");
    assert!(begun.elapsed() < whole * 2 / 3, "{:?} of {whole:?}", begun.elapsed());
    assert_eq!(client.published(URI, 3), Vec::<Value>::new());

    change(&mut client, 4, "0.012 kg·m²");
    let id = hover(&mut client);
    sleep(whole / 5);
    client.notify("$/cancelRequest", json!({ "id": id }));
    let answer = client.answer(id);
    assert_eq!(answer["error"]["code"], -32800, "{answer}");
    // The findings come all the same: it was the request that nobody wanted.
    client.published(URI, 4);
    client.finish();
}
