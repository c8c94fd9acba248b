// The page of the panel, as a tree: a pure function of what the server answered and what the reader has picked.

import type { Chart, Choice, Results } from "../results";
import { valueAt } from "./curve";
import { draw, quantity, type Frame } from "./chart";
import { digits } from "./scale";
import { caseName, casesTable, criteriaTable, pointsTable, resultsTable, valueText } from "./tables";
import { h, type Element, type Node } from "./tree";

/** What is to be shown. */
export interface State {
  readonly results: Results;
  readonly choice: Choice;
  readonly spec: string;
  /** The last answer with a chart of the same drive, case and station, where there is none now. */
  readonly old: Results | undefined;
}

export interface Page {
  readonly nodes: readonly Node[];
  readonly frame: Frame | undefined;
  readonly chart: Chart | undefined;
}

/** What stands where the readings come. */
export const HOW_TO_READ = "Point at the chart, or use the arrow keys, to read it.";

/** The whole page, the chart so wide. What cannot be had while a line is being typed is shown as it was. */
export function page(state: State, width: number): Page {
  const { results, old } = state;
  const solved = results.chart === null ? (old ?? results) : results;
  const chart = solved.chart ?? undefined;
  const drawing = chart === undefined ? undefined : draw(chart, width, summary(solved, chart), peak(solved));
  const mark = solved === results ? undefined : "old";
  const nodes = [
    header(state),
    stations(solved, state.choice),
    h(
      "div",
      { class: "columns" },
      h(
        "div",
        { class: "picture" },
        notice(state),
        h("figure", { id: "figure", class: mark }, drawing?.svg),
        chart === undefined
          ? undefined
          : h("p", { id: "reading", "aria-live": "polite" }, HOW_TO_READ),
        h("div", { class: mark }, pointsTable(solved)),
      ),
      h(
        "div",
        { class: "numbers" },
        casesTable(results, state.choice),
        criteriaTable(results),
        h("div", { class: mark }, resultsTable(solved)),
      ),
    ),
  ];
  return { nodes, frame: drawing?.frame, chart };
}

function header({ results, choice, spec }: State): Element {
  const options = results.drives.map((name) =>
    h("option", { value: name, selected: choice.drive === name }, name),
  );
  const follows = h("option", { value: "", selected: choice.drive === undefined }, `at the cursor (${results.drive.name})`);
  return h(
    "header",
    {},
    h("h1", {}, h("button", { id: "drive-place", class: "link", type: "button", title: "Show the drive in the text" }, results.drive.name)),
    h("p", { class: "chain" }, results.drive.chain),
    h("p", { class: "of" }, spec, caseLine(results)),
    results.drives.length > 1
      ? h("label", { class: "field" }, "Drive ", h("select", { id: "drive" }, follows, options))
      : undefined,
  );
}

function caseLine(results: Results): string {
  const shown = results.cases[results.case];
  if (shown === undefined) {
    return "";
  }
  const changes = shown.changes.length === 0 ? "" : `: ${shown.changes.join(", ")}`;
  return `, case ${caseName(shown)}${changes}`;
}

/** The parts of the chain, one of them picked. */
function stations(results: Results, choice: Choice): Element {
  const follows = choice.station === undefined;
  const shown = results.station === null ? undefined : results.stations[results.station]?.part;
  const chip = (id: string, picked: boolean, words: string, title: string) =>
    h(
      "label",
      { class: picked ? "chip picked" : "chip", title },
      h("input", { type: "radio", name: "station", id, value: id.slice("station-".length), checked: picked }),
      h("span", {}, words),
    );
  const chips = results.stations
    .map((station, index) => ({ station, index }))
    .filter(({ station }) => station.role !== "supply")
    .map(({ station, index }) =>
      chip(`station-${index}`, !follows && index === results.station, station.part, `${station.role}, ${station.kind}`),
    );
  const cursor = chip("station-cursor", follows, `at the cursor${shown === undefined || !follows ? "" : `: ${shown}`}`, "The part under the cursor, else the first source");
  return h("fieldset", { class: "stations" }, h("legend", {}, "Seen from"), cursor, chips);
}

function notice({ results, old }: State): Element | undefined {
  if (results.chart !== null) {
    return undefined;
  }
  const why = results.noChart ?? "there is nothing to draw";
  return h(
    "p",
    { class: "notice", role: "status" },
    old === undefined ? `No chart: ${why}.` : `As it was before: ${why}.`,
  );
}

/** The greatest power of the station that is shown, as the server writes it. */
function peak(results: Results): string | undefined {
  const station = results.station === null ? undefined : results.stations[results.station];
  const of = results.results.find((part) => station !== undefined && part.part === station.part && part.port === null);
  const value = of?.rows.find((row) => row.name === "peak_power")?.value;
  return value?.type === "number" ? value.shown : undefined;
}

/** The chart in words, for who does not see it. */
export function summary(results: Results, chart: Chart): string {
  const station = results.station === null ? "" : (results.stations[results.station]?.part ?? "");
  const points = chart.points.map((point) => {
    const here = point.reached ? ", runs here from rest" : "";
    return `${point.stability} at ${valueText(point.speed)}, ${valueText(point.effort)}${here}`;
  });
  const met = points.length === 0 ? "The curves do not meet." : `Operating points: ${points.join("; ")}.`;
  return `${quantity(chart.effort.kind)} and power over speed at ${station}. ${met}`;
}

/** What the curves say at a speed. */
export function reading(chart: Chart, speed: number): string {
  const value = (curve: Chart["available"], unit: string) => {
    const found = valueAt(curve, speed);
    return found === undefined ? "none" : `${digits(found)} ${unit}`;
  };
  return [
    `${digits(speed)} ${chart.speed.unit}`,
    `available ${value(chart.available, chart.effort.unit)}`,
    `required ${value(chart.required, chart.effort.unit)}`,
    `up to ${value(chart.availablePower, chart.power.unit)}`,
  ].join("   ");
}

/** Answers kept at most. */
const KEPT = 50;

/** The last answer with a chart of each drive, case and station, for while a line is being typed. */
export class Pictures {
  private readonly kept = new Map<string, Results>();

  keep(results: Results): void {
    if (results.chart === null) {
      return;
    }
    for (const key of [pictureKey(results, true), pictureKey(results, false)]) {
      this.kept.delete(key);
      this.kept.set(key, results);
    }
    for (const oldest of [...this.kept.keys()].slice(0, -KEPT)) {
      this.kept.delete(oldest);
    }
  }

  /** What was there before an answer without a chart. A drive that cannot be read has no parts to tell the station by. */
  before(results: Results): Results | undefined {
    return results.chart === null ? this.kept.get(pictureKey(results, results.station !== null)) : undefined;
  }
}

/** Tells one picture from another. */
function pictureKey(results: Results, withStation: boolean): string {
  const of = results.cases[results.case];
  const station = !withStation || results.station === null ? "" : results.stations[results.station]?.part;
  return JSON.stringify([results.uri, results.drive.name, of?.label, of?.gear, withStation, station]);
}

/** What follows from a pick in the page. */
export function picked(results: Results, choice: Choice, name: string, value: string): Choice {
  const { drive: _drive, ...noDrive } = choice;
  const { case: _case, gear: _gear, ...noCase } = choice;
  const { station: _station, ...noStation } = choice;
  if (name === "drive") {
    // Another drive has other cases and parts.
    return value === "" ? noDrive : { drive: value };
  }
  if (name === "case") {
    const of = results.cases[Number(value)];
    return value === "cursor" || of === undefined
      ? noCase
      : { ...noCase, case: of.label, ...(of.gear === null ? {} : { gear: of.gear }) };
  }
  const of = results.stations[Number(value)];
  return value === "cursor" || of === undefined ? noStation : { ...noStation, station: of.part };
}
