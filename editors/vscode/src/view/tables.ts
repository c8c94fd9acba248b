// The numbers: operating points, cases to pick, criteria, every result.

import type { Case, Choice, Criterion, Results, Value } from "../results";
import { quantity } from "./chart";
import { h, type Element, type Node } from "./tree";

/** A value with what must be known of it. */
export function valueText(value: Value | null | undefined): string {
  if (value === null || value === undefined) {
    return "";
  }
  if (value.type === "absent") {
    return value.reason ?? value.shown;
  }
  if (value.type === "word") {
    return value.shown.replace(/_/g, " ");
  }
  const marks = [
    value.outside_data === true ? "outside the measured range" : "",
    value.scaled_data === true ? "scaled data" : "",
    value.type === "unbounded" && value.reason !== undefined ? value.reason : "",
  ].filter((mark) => mark !== "");
  return marks.length === 0 ? value.shown : `${value.shown} (${marks.join("; ")})`;
}

/** A verdict by sign and word. */
export function verdictText(verdict: string | null): string {
  const words: Record<string, string> = { holds: "✓ holds", fails: "✗ fails", not_judged: "? not judged" };
  return verdict === null ? "" : (words[verdict] ?? verdict.replace(/_/g, " "));
}

type Cell = string | { readonly of: string; readonly nodes: readonly Node[] };

function table(title: string, id: string, head: readonly string[], rows: readonly (readonly Cell[])[], of = ""): Element {
  const cell = (content: Cell, index: number) => {
    const tag = index === 0 ? "th" : "td";
    const scope = index === 0 ? { scope: "row" } : {};
    return typeof content === "string"
      ? h(tag, scope, content)
      : h(tag, { ...scope, class: content.of === "" ? undefined : content.of }, ...content.nodes);
  };
  return h(
    "section",
    { class: of === "" ? undefined : of, "aria-labelledby": `${id}-title` },
    h("h2", { id: `${id}-title` }, title),
    h(
      "div",
      { id, class: "scrolls", "data-scrolls": true, tabindex: 0, role: "group", "aria-labelledby": `${id}-title` },
      h(
        "table",
        {},
        head.length === 0 ? [] : [h("thead", {}, h("tr", {}, head.map((word) => h("th", { scope: "col" }, word))))],
        h("tbody", {}, rows.map((row) => h("tr", {}, row.map(cell)))),
      ),
    ),
  );
}

/** Every operating point, numbered as in the chart. */
export function pointsTable(results: Results): Element | undefined {
  const chart = results.chart;
  if (chart === null) {
    return undefined;
  }
  if (chart.points.length === 0) {
    return h("section", {}, h("h2", {}, "Operating points"), h("p", {}, "There is none: the curves do not meet."));
  }
  const power = chart.points.some((point) => point.power !== undefined);
  const shapes = { stable: "●", unstable: "◇", marginal: "△" };
  const rows = chart.points.map((point, index) => [
    `${index + 1} ${shapes[point.stability] ?? ""} ${point.stability}`,
    valueText(point.speed),
    valueText(point.effort),
    ...(power ? [valueText(point.power)] : []),
    point.mode.replace(/_/g, " "),
    point.reached ? "runs here from rest" : "",
  ]);
  const head = ["point", "speed", quantity(chart.effort.kind), ...(power ? ["power"] : []), "mode", ""];
  return table("Operating points", "points", head, rows, "points");
}

/** The label of a case with its gear. */
export function caseName(of: Case): string {
  return of.gear === null ? of.label : `${of.label}, gear ${of.gear}`;
}

/** The cases, one of them picked; the first line leaves it to the cursor. */
export function casesTable(results: Results, choice: Choice): Element {
  const follows = choice.case === undefined;
  const shown = results.cases[results.case];
  const radio = (id: string, picked: boolean, words: string): Cell => ({
    of: "pick",
    nodes: [
      h(
        "label",
        {},
        h("input", { type: "radio", name: "case", id, value: id.slice("case-".length), checked: picked }),
        h("span", {}, words),
      ),
    ],
  });
  const first: Cell[] = [radio("case-cursor", follows, "at the cursor"), "", "", ""];
  if (follows && shown !== undefined) {
    first[1] = `now ${caseName(shown)}`;
  }
  const rows = results.cases.map((one, index): Cell[] => [
    radio(`case-${index}`, !follows && index === results.case, caseName(one)),
    one.outcome,
    valueText(one.speed),
    { of: "verdict", nodes: [verdictText(one.verdict)] },
  ]);
  return table("Cases", "cases", ["case", "from rest", "speed", "criteria"], [first, ...rows], "cases");
}

/** The criteria in the case that is shown. */
export function criteriaTable(results: Results): Element | undefined {
  if (results.criteria.length === 0) {
    return undefined;
  }
  const rows = results.criteria.map((criterion, index): Cell[] => {
    const here = criterion.here[0];
    const clause = h("button", { id: `criterion-${index}`, class: "link", type: "button" }, criterion.clause);
    return [
      { of: "", nodes: [clause, h("div", { class: "of" }, overAll(criterion))] },
      criterion.required,
      here === undefined ? "" : valueText(here.found),
      here?.margin?.shown ?? "",
      { of: `verdict ${here?.verdict ?? "none"}`, nodes: [here === undefined ? "not asked" : verdictText(here.verdict)] },
    ];
  });
  return table("Criteria", "criteria", ["criterion", "required", "found", "margin", "in this case"], rows, "criteria");
}

function overAll(criterion: Criterion): string {
  const judged = criterion.verdict === "holds" || criterion.verdict === "fails";
  const at = criterion.governing === null || !judged ? "" : `, tightest in ${criterion.governing.case}`;
  return `${verdictText(criterion.verdict)} over all cases${at}`;
}

/** Every result that has an answer, part by part. */
export function resultsTable(results: Results): Element {
  const rows = results.results.flatMap((part) => {
    const of = [part.part === "" ? results.drive.name : part.part, part.port ?? ""].filter((word) => word !== "").join(".");
    return part.rows.map((row): Cell[] => [
      { of: "name", nodes: [`${of}.${row.name}`] },
      valueText(row.value),
      row.meaning,
    ]);
  });
  return table("All results", "results", ["result", "value", "what it is"], rows, "all");
}
