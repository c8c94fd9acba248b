//! Edits as fast as they can be sent: the server's text must be the client's, seen through what it finds in it.

use serde_json::{Value, json};

use crate::client::Client;

/// Numbers that are the same in every run.
struct Random(u64);

impl Random {
    fn below(&mut self, most: usize) -> usize {
        self.0 = self.0.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
        (self.0 >> 33) as usize % most.max(1)
    }
}

/// A text as the client has it.
struct Text(Vec<String>);

impl Text {
    fn new(text: &str) -> Self {
        Self(text.split('\n').map(str::to_owned).collect())
    }

    fn whole(&self) -> String {
        self.0.join("\n")
    }

    /// Replaces from one place to another, characters counted; gives the change in UTF-16.
    fn replace(&mut self, from: (usize, usize), to: (usize, usize), new: &str) -> Value {
        let split = |line: &str, column: usize| {
            let at = line.char_indices().nth(column).map_or(line.len(), |(at, _)| at);
            (line[..at].to_owned(), line[at..].to_owned())
        };
        let (head, _) = split(&self.0[from.0], from.1);
        let (until, tail) = split(&self.0[to.0], to.1);
        let place =
            |line: usize, before: &str| json!({ "line": line, "character": before.encode_utf16().count() });
        let range = json!({ "start": place(from.0, &head), "end": place(to.0, &until) });
        let joined = format!("{head}{new}{tail}");
        self.0.splice(from.0..=to.0, joined.split('\n').map(str::to_owned));
        json!({ "range": range, "text": new })
    }

    fn random(&mut self, random: &mut Random) -> Value {
        let pieces =
            ["", "", "x", "\n", "5 kW", "let q = 𝄞\n", "é", "{", "}", "𝄞𝄞", " + 3 kN", "\"", "# ü\n", "N·m"];
        let first = random.below(self.0.len());
        let last = (first + random.below(2)).min(self.0.len() - 1);
        let (a, b) =
            (random.below(self.0[first].chars().count() + 1), random.below(self.0[last].chars().count() + 1));
        let (from, to) =
            if first == last { ((first, a.min(b)), (first, a.max(b))) } else { ((first, a), (last, b)) };
        let new = pieces[random.below(pieces.len())];
        self.replace(from, to, new)
    }
}

const BEGIN: &str = "title \"𝄞 mill\"\nlet a = 5 kW + 3 kN\nlet bé = 2 * a\nsource m: straight_line { stall_torque = 5 N·m; no_load_speed = 3000 rpm }\n\
                     let c = m.stall_torque\nlet d = 7 kg # 𝄞\nlet e = d + c\n";

fn storm(seed: u64, edits: usize, batch: usize) {
    let mut random = Random(seed);
    let mut client = Client::with(json!({}));
    let uri = "untitled:storm.shaft";
    client.open(uri, BEGIN);
    let mut text = Text::new(BEGIN);
    let mut version = 1;
    for _ in 0..edits {
        let changes: Vec<Value> = (0..=random.below(batch)).map(|_| text.random(&mut random)).collect();
        version += 1;
        client.change(uri, version, json!(changes));
        if text.0.len() > 60 {
            text = Text::new(BEGIN);
            version += 1;
            client.change(uri, version, json!([{ "text": BEGIN }]));
        }
    }
    let told = client.published(uri, version);
    let fresh = "untitled:fresh.shaft";
    client.open(fresh, &text.whole());
    let wanted = client.published(fresh, 1);
    let plain = |found: Vec<Value>| json!(found).to_string().replace("fresh.shaft", "storm.shaft");
    assert_eq!(plain(told), plain(wanted), "seed {seed}: {}", text.whole());
    client.finish();
}

#[test]
fn a_thousand_rapid_edits() {
    for seed in 1..=3 {
        storm(seed, 1_000, 1);
    }
}

#[test]
fn storms_of_several_edits_at_once() {
    for seed in 11..=14 {
        storm(seed, 200, 6);
    }
}

#[test]
fn a_burst_is_not_answered_edit_by_edit() {
    let mut client = Client::with(json!({}));
    let uri = "untitled:burst.shaft";
    client.open(uri, BEGIN);
    let mut text = Text::new(BEGIN);
    for version in 2..=1_001 {
        let column = text.0[1].chars().count();
        let change = text.replace((1, column), (1, column), if version % 2 == 0 { " " } else { "#" });
        client.change(uri, version, json!([change]));
    }
    client.published(uri, 1_001);
    let told = client
        .waiting
        .iter()
        .filter(|message| message["method"] == "textDocument/publishDiagnostics")
        .count();
    assert!(told < 500, "{told} times for 1,000 edits");
    client.finish();
}
