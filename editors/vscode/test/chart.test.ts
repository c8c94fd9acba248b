// The chart: what is drawn of what is there, told by shape and word, with labels that are clear of one another.

import assert from "node:assert/strict";
import { test } from "node:test";

import type { Chart, OperatingPoint } from "../src/results";
import { draw, HEIGHT, marker } from "../src/view/chart";
import { label, lengthIn, overlap } from "../src/view/labels";
import { find, textOf, type Element } from "../src/view/tree";
import { chart, number } from "./sample";

const WIDTH = 560;
const of = (name: string) => (element: Element) => (element.attributes["class"] ?? "").split(" ").includes(name);
const drawn = (more: Partial<Chart> = {}, peak?: string) => draw(chart(more), WIDTH, "summary", peak).svg;
const texts = (svg: Element) => find(svg, (element) => element.tag === "text").map(textOf);

test("both curves in both panes, each with dashes of its own and its name beside it", () => {
  const svg = drawn();
  assert.equal(find(svg, (e) => e.tag === "polyline" && of("available")(e)).length, 2);
  assert.equal(find(svg, (e) => e.tag === "polyline" && of("required")(e)).length, 2);
  assert.equal(texts(svg).filter((text) => text === "available").length, 2);
  assert.equal(texts(svg).filter((text) => text === "required").length, 2);
  assert.ok(texts(svg).includes("torque, N·m") && texts(svg).includes("power, kW") && texts(svg).includes("speed, rpm"));
});

test("every operating point is there, in both panes, numbered and named", () => {
  const svg = drawn();
  const { points } = chart();
  assert.deepEqual(points.map((point) => point.stability), ["stable", "unstable", "stable"], "the sample is met three times");
  assert.equal(find(svg, of("point")).length, 6);
  assert.equal(find(svg, (e) => of("point")(e) && of("unstable")(e)).length, 2);
  for (const name of ["1 runs here", "2 unstable", "3 stable"]) {
    assert.ok(texts(svg).includes(name), `${name} among ${texts(svg).join(", ")}`);
  }
  assert.equal(find(svg, of("ring")).length, 2);
  assert.ok(texts(svg).includes(points[0]?.speed.shown ?? "?"), "the speed reached stands at the axis");
});

test("a point stands where its numbers say", () => {
  const { svg, frame } = draw(chart(), WIDTH, "summary");
  const point = chart().points[0];
  const ring = find(svg, of("ring"))[0];
  assert.ok(Math.abs(Number(ring?.attributes["cx"]) - frame.x.at(point?.speed.value ?? NaN)) < 0.1);
});

test("shapes tell stable from unstable without colour", () => {
  const shape = (stability: OperatingPoint["stability"]) => {
    const point: OperatingPoint = { speed: number(1, "rpm"), effort: number(1, "N·m"), stability, mode: "motoring", reached: false };
    const [first] = marker(point, 10, 10).children;
    return typeof first === "object" ? `${first.tag} ${first.attributes["d"] ?? ""}` : "";
  };
  assert.equal(new Set(["stable", "unstable", "marginal"].map((word) => shape(word as OperatingPoint["stability"]))).size, 3);
});

test("what the source can give for long, with its number", () => {
  assert.equal(find(drawn(), of("continuous")).length, 1);
  assert.ok(texts(drawn()).includes("for long 47.2 N·m"));
  const without = drawn({ continuous: null });
  assert.equal(find(without, of("continuous")).length, 0);
  assert.ok(!texts(without).some((text) => text.startsWith("for long")));
});

test("the most power, as the server writes it", () => {
  assert.ok(texts(drawn({}, "11.8 kW")).includes("most 11.8 kW"));
  assert.ok(!texts(drawn()).some((text) => text.startsWith("most")));
});

test("outside of what was measured the chart is hatched and says so", () => {
  assert.equal(find(drawn(), of("outside")).length, 2);
  assert.ok(texts(drawn()).includes("measured to here"));
  const wide = drawn({ measured: { low: number(400, "rpm"), high: number(1000, "rpm") } });
  assert.equal(find(wide, of("outside")).length, 4);
  assert.equal(texts(wide).filter((text) => text === "not measured").length, 2);
  assert.equal(find(drawn({ measured: null }), of("outside")).length, 0);
  assert.equal(find(drawn({ measured: { low: number(0, "rpm"), high: number(9000, "rpm") } }), of("outside")).length, 0);
});

test("a point that is driven back is in the picture", () => {
  const back: OperatingPoint = {
    speed: number(-300, "rpm"), effort: number(45, "N·m"), stability: "stable", mode: "driven_back", reached: true,
  };
  const { svg, frame } = draw(chart({ points: [back] }), WIDTH, "summary");
  assert.ok(frame.x.low < -300);
  const x = Number(find(svg, of("ring"))[0]?.attributes["cx"]);
  assert.ok(x > 50 && x < WIDTH);
});

test("an overhauling load lies below the axis and in the picture", () => {
  const required = chart().required.map(([speed]) => [speed, -20] as const);
  const point: OperatingPoint = {
    speed: number(1530, "rpm"), effort: number(-20, "N·m"), stability: "stable", mode: "braking", reached: true,
  };
  const svg = drawn({ required, points: [point] });
  const ring = find(svg, of("ring"))[0];
  const pane = find(svg, (e) => e.tag === "clipPath")[0]?.children[0];
  assert.ok(typeof pane === "object");
  const bottom = Number(pane.attributes["y"]) + Number(pane.attributes["height"]);
  assert.ok(Number(ring?.attributes["cy"]) < bottom - 4, `${ring?.attributes["cy"]} above ${bottom}`);
});

/** Boxes of all names in a picture. */
function boxes(svg: Element) {
  return find(svg, of("name")).map((element) =>
    label(textOf(element), Number(element.attributes["x"]), Number(element.attributes["y"]), (element.attributes["text-anchor"] ?? "start") as "start"),
  );
}

test("names keep clear of one another and inside the picture, at every width", () => {
  for (let width = 320; width <= 760; width += 40) {
    const found = boxes(draw(chart(), width, "summary", "11.8 kW").svg);
    assert.ok(found.length >= 8);
    for (const [index, one] of found.entries()) {
      assert.ok(one.box.left >= 0 && one.box.right <= width && one.box.top >= 0 && one.box.bottom <= HEIGHT, `${one.text} at ${width}`);
      for (const other of found.slice(index + 1)) {
        // A sliver is not seen: the boxes are wider than the letters.
        assert.ok(overlap(one.box, other.box) < 40, `${one.text} on ${other.text} at ${width}`);
      }
    }
  }
});

test("names keep clear of the curves where there is room", () => {
  const svg = drawn();
  const curves = find(svg, (e) => e.tag === "polyline").map((e) =>
    (e.attributes["points"] ?? "").split(" ").map((pair) => pair.split(",").map(Number) as [number, number]),
  );
  for (const name of boxes(svg).filter(({ text }) => text === "available" || text === "required")) {
    const crossed = curves.reduce((sum, curve) => sum + lengthIn(curve, name.box), 0);
    assert.ok(crossed < 4, `${name.text} is crossed over ${crossed} pixels`);
  }
});

test("hostile numbers draw something and throw nothing", () => {
  const none = drawn({ available: [], required: [], availablePower: [], points: [], continuous: null, measured: null });
  assert.equal(none.tag, "svg");
  const odd = drawn({ available: [[0, NaN], [10, Infinity]], required: [[5, 5]], availablePower: [[0, 0]] });
  assert.ok(!JSON.stringify(odd).includes("NaN") && !JSON.stringify(odd).includes("Infinity"), JSON.stringify(odd).match(/.{60}NaN.{20}/)?.[0]);
});
