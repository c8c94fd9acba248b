// The chart: what is available and what is required over the speed, above; the power, below; one axis of speed for both.
// Every line has its own dashes and its name beside it, every sort of point its own shape.

import type { Chart, OperatingPoint, Place, Value } from "../results";
import { powerFactor, way, written, type Way } from "./curve";
import { aroundPoint, besideCurve, best, label, overlap, widthOf, type Box, type Label, type Surroundings } from "./labels";
import { digits, scale, ticks, type Scale } from "./scale";
import { h, type Element, type Node } from "./tree";

const LEFT = 56;
const RIGHT = 14;
const TOP = 26;
const EFFORT = 210;
const BETWEEN = 34;
const POWER = 120;
const BOTTOM = 46;
export const HEIGHT = TOP + EFFORT + BETWEEN + POWER + BOTTOM;

/** Where the panes lie, for reading values off with pointer and keys. */
export interface Frame {
  readonly x: Scale;
  readonly top: number;
  readonly bottom: number;
}

export interface Drawing {
  readonly svg: Element;
  readonly frame: Frame;
}

/** What a pane shows. */
interface Pane {
  readonly box: Box;
  readonly x: Scale;
  readonly y: Scale;
  readonly title: string;
  /** Class, name and way of each line. */
  readonly lines: readonly { readonly of: string; readonly name: string; readonly way: Way }[];
  readonly marks: readonly { readonly point: OperatingPoint; readonly x: number; readonly y: number }[];
}

/** The quantity of an axis in plain words. */
export function quantity(kind: string): string {
  const words: Record<string, string> = { rotational_speed: "speed", mechanical_power: "power" };
  return words[kind] ?? kind.replace(/_/g, " ");
}

/** Draws a chart so wide. `peak` is the greatest power, as the server writes it. */
export function draw(chart: Chart, width: number, summary: string, peak?: string): Drawing {
  const x = speedScale(chart, LEFT, width - RIGHT);
  const upper = effortPane(chart, x, { left: LEFT, top: TOP, right: width - RIGHT, bottom: TOP + EFFORT });
  const below = TOP + EFFORT + BETWEEN;
  const lower = powerPane(chart, x, { left: LEFT, top: below, right: width - RIGHT, bottom: below + POWER });
  const svg = h(
    "svg",
    {
      id: "chart",
      class: "chart",
      viewBox: `0 0 ${width} ${HEIGHT}`,
      width,
      height: HEIGHT,
      role: "slider",
      tabindex: 0,
      "aria-label": summary,
      "aria-describedby": "reading",
      "aria-valuemin": x.low,
      "aria-valuemax": x.high,
      "aria-valuenow": x.low,
      "aria-valuetext": "arrow keys read the curves",
    },
    definitions([upper, lower]),
    [upper, lower].flatMap((pane, index) => outsideData(chart, pane, index === 0)),
    plot(upper, 0, continuousLine(chart, upper), 5),
    plot(lower, 1, peakMark(chart, lower, peak), 3),
    speedAxis(chart, x, lower.box.bottom),
    h("line", { id: "reader", class: "reader hidden", x1: 0, x2: 0, y1: TOP, y2: lower.box.bottom }),
  );
  return { svg, frame: { x, top: TOP, bottom: lower.box.bottom } };
}

function speedScale(chart: Chart, left: number, right: number): Scale {
  const speeds = [chart.available, chart.required].flatMap((curve) => curve.map(([speed]) => speed));
  const points = chart.points.map((point) => point.speed.value ?? 0);
  const low = Math.min(0, ...speeds, ...points.map((speed) => speed * 1.08));
  const high = Math.max(...speeds, ...points.map((speed) => speed * 1.08), 0);
  return scale(low, high > low ? high : low + 1, left, right);
}

/** From the least to the greatest value worth a look; beyond, curves leave the picture. */
function valueScale(curves: readonly (readonly Place[])[], marked: readonly number[], box: Box): Scale {
  const [first = []] = curves;
  const firsts = first.map(([, value]) => value).filter(Number.isFinite);
  const most = Math.max(0, ...firsts, ...marked.map((value) => value * 1.15));
  const top = most > 0 ? most * 1.06 : 1;
  const least = Math.min(0, ...curves.flatMap((curve) => curve.map(([, value]) => value)).filter(Number.isFinite));
  // Braking sides are drawn as far as a point lies there, else a little.
  const low = Math.min(0, ...marked.map((value) => value * 1.35), Math.max(least, -0.12 * top));
  return scale(low, top, box.bottom, box.top);
}

function effortPane(chart: Chart, x: Scale, box: Box): Pane {
  const marked = chart.points.map((point) => point.effort.value ?? 0);
  const y = valueScale([chart.available, chart.required], [...marked, chart.continuous?.value ?? 0], box);
  const marks = chart.points.map((point, index) => ({ point, x: x.at(point.speed.value ?? 0), y: y.at(marked[index] ?? 0) }));
  return {
    box,
    x,
    y,
    title: `${quantity(chart.effort.kind)}, ${chart.effort.unit}`,
    lines: [
      { of: "available", name: "available", way: way(chart.available, x, y) },
      { of: "required", name: "required", way: way(chart.required, x, y) },
    ],
    marks,
  };
}

function powerPane(chart: Chart, x: Scale, box: Box): Pane {
  const factor = powerFactor(chart.available, chart.availablePower);
  const required: Place[] = chart.required.map(([speed, effort]) => [speed, speed * effort * factor]);
  const power = (point: OperatingPoint) =>
    point.power?.value ?? (point.speed.value ?? 0) * (point.effort.value ?? 0) * factor;
  const y = valueScale([chart.availablePower, required], chart.points.map(power), box);
  const marks = chart.points.map((point) => ({ point, x: x.at(point.speed.value ?? 0), y: y.at(power(point)) }));
  return {
    box,
    x,
    y,
    title: `${quantity(chart.power.kind)}, ${chart.power.unit}`,
    lines: [
      { of: "available", name: "available", way: way(chart.availablePower, x, y) },
      { of: "required", name: "required", way: way(required, x, y) },
    ],
    marks,
  };
}

function definitions(panes: readonly Pane[]): Element {
  const clips = panes.map(({ box }, index) =>
    h("clipPath", { id: `pane${index}` }, h("rect", { x: box.left, y: box.top, width: box.right - box.left, height: box.bottom - box.top })),
  );
  const hatch = h(
    "pattern",
    { id: "hatch", width: 7, height: 7, patternUnits: "userSpaceOnUse", patternTransform: "rotate(45)" },
    h("line", { class: "hatch", x1: 0, y1: 0, x2: 0, y2: 7 }),
  );
  return h("defs", {}, hatch, clips);
}

/** Speeds where the data of the source say nothing. */
function outsideData(chart: Chart, pane: Pane, named: boolean): Node[] {
  const { low, high } = chart.measured ?? {};
  const { box, x } = pane;
  const parts: [number, number][] = [];
  if (low?.value !== undefined && low.value > x.low) {
    parts.push([box.left, Math.min(x.at(low.value), box.right)]);
  }
  if (high?.value !== undefined && high.value < x.high) {
    parts.push([Math.max(x.at(high.value), box.left), box.right]);
  }
  return parts.flatMap(([left, right]) => {
    if (right - left < 1) {
      return [];
    }
    const edge = left > box.left ? left : right;
    return [
      h("rect", { class: "outside", fill: "url(#hatch)", x: left, y: box.top, width: right - left, height: box.bottom - box.top }),
      h("line", { class: "edge", x1: edge, x2: edge, y1: box.top, y2: box.bottom }),
      ...(named ? [edgeName(edge, left, right, box)] : []),
    ];
  });
}

/** Says what a hatched part is: above it where there is room, else what the part beside it is. */
function edgeName(edge: number, left: number, right: number, box: Box): Element {
  const last = edge === left;
  const roomy = right - left >= widthOf("not measured") + 8;
  const text = roomy ? "not measured" : last ? "measured to here" : "measured from here";
  const rightward = roomy === last;
  return h(
    "text",
    { class: "note", x: edge + (rightward ? 4 : -4), y: box.top - 5, "text-anchor": rightward ? "start" : "end" },
    text,
  );
}

/** A line of a pane beside its curves, with its name. */
interface Extra {
  readonly nodes: readonly Node[];
  readonly labels: readonly { readonly of: string; readonly places: readonly Label[] }[];
  readonly curves: readonly Way[];
}

function continuousLine(chart: Chart, pane: Pane): Extra {
  const value = chart.continuous?.value;
  if (chart.continuous === null || value === undefined) {
    return { nodes: [], labels: [], curves: [] };
  }
  const { box, y } = pane;
  const at = y.at(value);
  const text = `for long ${chart.continuous.shown}`;
  const places = [0.02, 0.98, 0.25, 0.5, 0.75].flatMap((share) => {
    const x = box.left + share * (box.right - box.left);
    const anchor = share < 0.1 ? "start" : share > 0.9 ? "end" : "middle";
    return [label(text, x, at - 5, anchor), label(text, x, at + 14, anchor)];
  });
  return {
    nodes: [h("line", { class: "continuous", x1: box.left, x2: box.right, y1: at, y2: at })],
    labels: [{ of: "limit", places }],
    curves: [[[box.left, at], [box.right, at]]],
  };
}

function peakMark(chart: Chart, pane: Pane, peak: string | undefined): Extra {
  const highest = chart.availablePower.reduce<Place | undefined>(
    (best, place) => (best === undefined || place[1] > best[1] ? place : best),
    undefined,
  );
  if (highest === undefined || peak === undefined) {
    return { nodes: [], labels: [], curves: [] };
  }
  const [x, y] = [pane.x.at(highest[0]), pane.y.at(highest[1])];
  return {
    nodes: [h("path", { class: "peak", d: `M${x - 6} ${y}H${x + 6}M${x} ${y - 5}V${y + 5}` })],
    labels: [{ of: "most", places: aroundPoint(`most ${peak}`, x, y) }],
    curves: [],
  };
}

/** A pane: axes, lines, marks, names. `rows` is about how many numbers stand along its axis. */
function plot(pane: Pane, index: number, extra: Extra, rows: number): Node[] {
  const { box, x, y } = pane;
  const zero = y.at(0);
  const sizes = ticks(y.low, y.high, rows);
  const inside = { clipped: `url(#pane${index})` };
  return [
    ...sizes.map((size) => h("line", { class: "grid", x1: box.left, x2: box.right, y1: y.at(size), y2: y.at(size) })),
    ...sizes.map((size) => h("text", { class: "tick", x: box.left - 7, y: y.at(size) + 4, "text-anchor": "end" }, digits(size))),
    h("path", { class: "axis", d: `M${x.at(0)} ${box.top}V${box.bottom}M${box.left} ${zero}H${box.right}` }),
    h("text", { class: "title", x: 2, y: box.top - 10 }, pane.title),
    ...pane.marks
      .filter((mark) => mark.point.reached)
      .map((mark) => h("line", { class: "drop", x1: mark.x, x2: mark.x, y1: mark.y, y2: index === 0 ? box.bottom + BETWEEN : box.bottom })),
    h(
      "g",
      { "clip-path": inside.clipped },
      ...extra.nodes,
      ...pane.lines.map((line) => h("polyline", { class: line.of, points: written(line.way) })),
    ),
    ...pane.marks.map((mark) => marker(mark.point, mark.x, mark.y)),
    ...names(pane, index, extra),
  ];
}

/** The shape says how stable a point is, a ring that the drive comes to it. */
export function marker(point: OperatingPoint, x: number, y: number): Element {
  const shapes = {
    stable: h("circle", { cx: x, cy: y, r: 4 }),
    unstable: h("path", { d: `M${x} ${y - 6}L${x + 6} ${y}L${x} ${y + 6}L${x - 6} ${y}Z` }),
    marginal: h("path", { d: `M${x - 5} ${y + 4}L${x} ${y - 6}L${x + 5} ${y + 4}Z` }),
  };
  const ring = point.reached ? [h("circle", { class: "ring", cx: x, cy: y, r: 8 })] : [];
  return h("g", { class: `point ${point.stability}` }, shapes[point.stability] ?? shapes.marginal, ...ring);
}

/** What a point is called in the chart. */
export function pointName(point: OperatingPoint, number: number, of: number): string {
  const word = point.reached ? "runs here" : point.stability;
  return of > 1 ? `${number} ${word}` : word;
}

/** Names of points, lines and limits, each where it is clear of the others. */
function names(pane: Pane, index: number, extra: Extra): Node[] {
  const { box } = pane;
  const room = { left: box.left + 2, top: box.top + 1, right: box.right - 1, bottom: box.bottom - 2 };
  const boxes: Box[] = pane.marks.map(({ x, y }) => ({ left: x - 9, top: y - 9, right: x + 9, bottom: y + 9 }));
  const zero: Way = [[box.left, pane.y.at(0)], [box.right, pane.y.at(0)]];
  const around: Surroundings = { inside: room, curves: [...pane.lines.map((line) => line.way), ...extra.curves, zero], boxes };
  const wanted: { of: string; places: readonly Label[] }[] = [];
  if (index === 0) {
    const many = pane.marks.length;
    pane.marks.slice(0, 9).forEach((mark, at) =>
      wanted.push({ of: "meeting", places: aroundPoint(pointName(mark.point, at + 1, many), mark.x, mark.y) }),
    );
  }
  wanted.push(...extra.labels);
  wanted.push(...pane.lines.map((line) => ({ of: `of-${line.of}`, places: besideCurve(line.name, line.way, room) })));
  const out: Node[] = [];
  for (const { of, places } of wanted) {
    const found = best(places, around);
    if (found !== undefined) {
      boxes.push(found.box);
      out.push(h("text", { class: `name ${of}`, x: found.x, y: found.y, "text-anchor": found.anchor }, found.text));
    }
  }
  return out;
}

/** Numbers of the speed under both panes; the speed the drive comes to stands among them. */
function speedAxis(chart: Chart, x: Scale, bottom: number): Node[] {
  const here = chart.points.filter((point) => point.reached);
  const marked = here.map((point) => at(point.speed, x, bottom));
  const width = x.at(x.high) - x.at(x.low);
  const numbers = ticks(x.low, x.high, Math.max(2, Math.floor(width / 70)))
    .map((speed) => label(digits(speed), x.at(speed), bottom + 16, "middle"))
    .filter((number) => marked.every((mark) => overlap(grown(number.box), mark.box) === 0));
  const title = `${quantity(chart.speed.kind)}, ${chart.speed.unit}`;
  const line = (mark: Label, of: string) => h("text", { class: of, x: mark.x, y: mark.y, "text-anchor": mark.anchor }, mark.text);
  return [
    ...ticks(x.low, x.high, Math.max(2, Math.floor(width / 70))).map((speed) =>
      h("line", { class: "axis", x1: x.at(speed), x2: x.at(speed), y1: bottom, y2: bottom + 4 }),
    ),
    ...numbers.map((number) => line(number, "tick")),
    ...marked.map((mark) => line(mark, "tick here")),
    h("text", { class: "title", x: x.at(x.high), y: bottom + 36, "text-anchor": "end" }, title),
  ];
}

function at(speed: Value, x: Scale, bottom: number): Label {
  const place = x.at(speed.value ?? 0);
  const half = widthOf(speed.shown) / 2;
  const right = x.at(x.high) + RIGHT;
  return label(speed.shown, Math.min(Math.max(place, half), right - half), bottom + 16, "middle");
}

function grown(box: Box): Box {
  return { ...box, left: box.left - 6, right: box.right + 6 };
}
