// The page of the panel: what it says, what follows from a pick, and that texts of a spec stay texts.

import assert from "node:assert/strict";
import { test } from "node:test";

import { choiceOf, isResults, type Choice, type Results } from "../src/results";
import { page, picked, Pictures, reading, summary, type State } from "../src/view/page";
import { valueText, verdictText } from "../src/view/tables";
import { find, h, textOf, type Element } from "../src/view/tree";
import { chart, number, results } from "./sample";

function shown(more: Partial<Results> = {}, choice: Choice = {}, old?: State["old"]): Element {
  return h("main", {}, page({ results: results(more), choice, spec: "mill.shaft", old }, 560).nodes);
}
const byId = (tree: Element, id: string) => find(tree, (e) => e.attributes["id"] === id)[0];
const rows = (tree: Element, id: string) => {
  const table = byId(tree, id);
  assert.ok(table !== undefined, `there is no ${id}`);
  return find(table, (e) => e.tag === "tr").map((row) => row.children.map(textOf));
};
const checked = (tree: Element, name: string) =>
  find(tree, (e) => e.attributes["name"] === name && "checked" in e.attributes).map((e) => e.attributes["id"]);

test("operating points as a table, numbered as in the chart, stability in words", () => {
  const [head, ...points] = rows(shown(), "points");
  assert.deepEqual(head, ["point", "speed", "torque", "mode", ""]);
  assert.equal(points.length, 3);
  assert.match(points[0]?.[0] ?? "", /^1 ● stable$/);
  assert.match(points[1]?.[0] ?? "", /^2 ◇ unstable$/);
  assert.equal(points[0]?.at(-1), "runs here from rest");
});

test("no operating point is said in words", () => {
  assert.ok(textOf(shown({ chart: chart({ points: [] }) })).includes("the curves do not meet"));
});

test("the cases with what becomes of each; the cursor chooses until one is picked", () => {
  const [, cursor, plain, weak, last] = rows(shown(), "cases");
  assert.deepEqual(cursor, ["at the cursor", "now plain", "", ""]);
  assert.deepEqual(plain, ["plain", "stalls at 412 rpm", "412 rpm", "✗ fails"]);
  assert.deepEqual(weak, ["weak[360 V]", "runs up", "1430 rpm (outside the measured range)", "✓ holds"]);
  assert.deepEqual(last, ["weak[340 V], gear 2", "not solved", "", "? not judged"]);
  assert.deepEqual(checked(shown(), "case"), ["case-cursor"]);
  assert.deepEqual(checked(shown({ case: 1 }, { case: "weak[360 V]" }), "case"), ["case-1"]);
});

test("stations are the parts that move; the cursor chooses until one is picked", () => {
  const stations = find(shown(), (e) => e.attributes["name"] === "station").map((e) => e.attributes["id"]);
  assert.deepEqual(stations, ["station-cursor", "station-1", "station-2", "station-3"]);
  assert.deepEqual(checked(shown(), "station"), ["station-cursor"]);
  assert.deepEqual(checked(shown({ station: 2 }, { station: "gear" }), "station"), ["station-2"]);
});

test("a pick changes one thing and leaves the others", () => {
  const all = results();
  assert.deepEqual(picked(all, { station: "gear" }, "case", "1"), { station: "gear", case: "weak[360 V]" });
  assert.deepEqual(picked(all, {}, "case", "2"), { case: "weak[340 V]", gear: "2" });
  assert.deepEqual(picked(all, { case: "weak[340 V]", gear: "2", station: "gear" }, "case", "cursor"), { station: "gear" });
  assert.deepEqual(picked(all, { case: "weak[340 V]", gear: "2" }, "case", "0"), { case: "plain" });
  assert.deepEqual(picked(all, { case: "plain" }, "station", "3"), { case: "plain", station: "drum" });
  assert.deepEqual(picked(all, { case: "plain", station: "drum" }, "station", "cursor"), { case: "plain" });
  assert.deepEqual(picked(all, { case: "plain", station: "drum" }, "drive", "fan"), { drive: "fan" });
  assert.deepEqual(picked(all, { drive: "fan", case: "plain" }, "drive", ""), { case: "plain" });
  assert.deepEqual(picked(all, {}, "case", "77"), {}, "what is not there is no choice");
});

test("every result with its full name, value and meaning", () => {
  const lines = rows(shown(), "results");
  assert.deepEqual(lines[1], ["mill.speed", "412 rpm", "speed of the drive"]);
  assert.deepEqual(lines.find(([name]) => name === "motor.mode"), ["motor.mode", "driven back", "what the source does"]);
  assert.deepEqual(lines.find(([name]) => name === "motor.current")?.[1], "no electrical data");
  assert.ok(lines.some(([name]) => name === "gear.input.torque"));
});

test("criteria with verdict in word and sign, here and over all cases", () => {
  assert.deepEqual(rows(shown(), "criteria")[1], [
    "M-1 speed✗ fails over all cases, tightest in plain", "at least 1400 rpm", "412 rpm", "−70.6 %", "✗ fails",
  ]);
  assert.equal(byId(shown({ criteria: [] }), "criteria"), undefined);
});

test("while a line is being typed the last picture stays, marked as old", () => {
  const why = "the drive is not solved in this case";
  const without = shown({ chart: null, noChart: why });
  assert.equal(byId(without, "chart"), undefined);
  assert.ok(textOf(without).includes(`No chart: ${why}`));
  const old = shown({ chart: null, noChart: why, stations: [], station: null, results: [] }, {}, results());
  assert.ok(byId(old, "chart") !== undefined);
  assert.equal(byId(old, "figure")?.attributes["class"], "old");
  assert.ok(textOf(old).includes(`As it was before: ${why}`));
  assert.equal(rows(old, "points").length, 4, "the numbers stay with the picture");
  assert.ok(byId(old, "station-2") !== undefined, "the parts stay, so that nothing jumps");
  assert.equal(find(shown(), (e) => e.attributes["class"] === "old").length, 0);
});

test("what stays is of the same spec, drive, case, gear and station", () => {
  const gone = { chart: null, noChart: "gone" };
  const before = (now: Partial<Results>) => {
    const pictures = new Pictures();
    pictures.keep(results());
    return pictures.before(results(now));
  };
  assert.ok(before(gone) !== undefined);
  assert.ok(before({ ...gone, version: 9 }) !== undefined);
  assert.ok(before({ ...gone, stations: [], station: null }) !== undefined, "a drive that cannot be read has no parts");
  for (const other of [{ case: 1 }, { case: 2 }, { station: 2 }, { uri: "file:///other.shaft" }]) {
    assert.equal(before({ ...gone, ...other }), undefined, JSON.stringify(other));
  }
  assert.equal(before({}), undefined, "what has a chart needs no old one");
});

test("no more is kept than can be looked at", () => {
  const pictures = new Pictures();
  for (let index = 0; index < 200; index += 1) {
    pictures.keep(results({ uri: `file:///${index}.shaft` }));
  }
  const before = (index: number) => pictures.before(results({ uri: `file:///${index}.shaft`, chart: null }));
  assert.equal(before(0), undefined);
  assert.ok(before(199) !== undefined);
});

test("texts of a spec stay texts", () => {
  const evil = '<img src=x onerror="alert(1)"><script>1</script>';
  const tree = shown({
    drive: { name: evil, chain: evil, underCursor: true, location: null },
    drives: [evil, "b"],
    cases: [{ label: evil, gear: evil, changes: [evil], outcome: evil, moves: true, speed: null, verdict: null }],
    stations: [{ part: evil, role: "source", kind: evil }],
    station: 0,
    criteria: results().criteria.map((criterion) => ({ ...criterion, clause: evil, required: evil })),
  });
  const tags = new Set(find(tree, () => true).map((element) => element.tag));
  assert.ok(!tags.has("script") && !tags.has("img"));
  assert.ok(textOf(tree).includes(evil), "it is shown as it is written");
  const handlers = find(tree, () => true).flatMap((e) => Object.keys(e.attributes)).filter((name) => /^on|^style$|^href$|^src$/.test(name));
  assert.deepEqual(handlers, []);
});

test("the chart in words, and what the curves say at a speed", () => {
  const words = summary(results(), chart());
  assert.match(words, /torque and power over speed at motor/);
  assert.match(words, /stable at .* rpm, .* N·m, runs here from rest; unstable at/);
  const said = reading(chart(), 750);
  assert.match(said, /^750 rpm {3}available [\d.]+ N·m {3}required 46\.25 N·m {3}up to [\d.]+ kW$/);
  assert.match(reading(chart(), 99_999), /available none/);
});

test("values and verdicts as words", () => {
  assert.equal(valueText(number(3, "N", { scaled_data: true, outside_data: true })), "3 N (outside the measured range; scaled data)");
  assert.equal(valueText({ type: "unbounded", shown: "no limit", reason: "nothing stops it" }), "no limit (nothing stops it)");
  assert.equal(valueText(null), "");
  assert.equal(verdictText("not_judged"), "? not judged");
  assert.equal(verdictText(null), "");
});

test("answers and messages of another form are not taken", () => {
  assert.ok(isResults(results()));
  for (const other of [null, undefined, "x", 1, {}, { schema: "results/2" }]) {
    assert.ok(!isResults(other));
  }
  assert.deepEqual(choiceOf({ drive: "a", case: 3, station: null, gear: "2", more: "x" }), { drive: "a", gear: "2" });
  assert.deepEqual(choiceOf("x"), {});
});
