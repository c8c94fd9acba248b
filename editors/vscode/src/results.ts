// What the server answers to `layshaft/results`, and what panel and page say to each other.

/** The request. */
export const RESULTS = "layshaft/results";

/** A value of the spec, as the command's `check/1` has it. */
export interface Value {
  readonly type: "number" | "flag" | "word" | "text" | "unbounded" | "absent";
  /** As a reader sees it. */
  readonly shown: string;
  readonly si?: number;
  readonly kind?: string;
  readonly unit?: string;
  /** In `unit`. */
  readonly value?: number;
  readonly outside_data?: boolean;
  readonly scaled_data?: boolean;
  readonly reason?: string;
}

export interface Axis {
  readonly kind: string;
  readonly unit: string;
}

/** A place of a curve, in the units of the axes. */
export type Place = readonly [speed: number, value: number];

export type Stability = "stable" | "unstable" | "marginal";

export interface OperatingPoint {
  readonly speed: Value;
  readonly effort: Value;
  readonly power?: Value;
  readonly stability: Stability;
  readonly mode: string;
  /** Whether the drive comes to it from rest. */
  readonly reached: boolean;
}

export interface Chart {
  readonly speed: Axis;
  readonly effort: Axis;
  readonly power: Axis;
  readonly available: readonly Place[];
  readonly required: readonly Place[];
  readonly availablePower: readonly Place[];
  readonly points: readonly OperatingPoint[];
  readonly continuous: Value | null;
  readonly measured: { readonly low: Value; readonly high: Value } | null;
}

export type Verdict = "holds" | "fails" | "not_judged";

export interface Case {
  readonly label: string;
  readonly gear: string | null;
  readonly changes: readonly string[];
  readonly outcome: string;
  /** Whether the drive does what a drive is for. */
  readonly moves: boolean;
  readonly speed: Value | null;
  readonly verdict: Verdict | null;
}

export interface Station {
  readonly part: string;
  readonly role: string;
  readonly kind: string;
}

export interface Outcome {
  readonly case: string;
  readonly verdict: string;
  readonly found: Value | null;
  readonly margin: { readonly shown: string } | null;
  readonly remark: string | null;
}

export interface Criterion {
  readonly clause: string;
  readonly condition: string;
  readonly required: string;
  readonly verdict: string;
  readonly location: unknown;
  readonly here: readonly Outcome[];
  readonly governing: Outcome | null;
}

export interface PartResults {
  /** Empty: the drive itself. */
  readonly part: string;
  readonly port: string | null;
  readonly rows: readonly { readonly name: string; readonly meaning: string; readonly value: Value }[];
}

export interface Results {
  readonly schema: string;
  readonly uri: string;
  readonly version: number | null;
  readonly drive: {
    readonly name: string;
    readonly chain: string;
    readonly underCursor: boolean;
    readonly location: unknown;
  };
  readonly drives: readonly string[];
  readonly cases: readonly Case[];
  readonly case: number;
  readonly stations: readonly Station[];
  readonly station: number | null;
  readonly chart: Chart | null;
  readonly noChart: string | null;
  readonly results: readonly PartResults[];
  readonly criteria: readonly Criterion[];
}

/** What the reader has picked; what is not there follows the cursor. */
export interface Choice {
  readonly drive?: string;
  readonly case?: string;
  readonly gear?: string;
  readonly station?: string;
}

/** From the panel to the page. */
export type ToPage =
  | { readonly type: "results"; readonly results: Results; readonly choice: Choice; readonly spec: string }
  | { readonly type: "nothing"; readonly why: string };

/** From the page to the panel. */
export type FromPage =
  | { readonly type: "ready" }
  | { readonly type: "choose"; readonly choice: Choice }
  /** Shows the text of the drive, or of a criterion by its number. */
  | { readonly type: "reveal"; readonly criterion: number | null };

/** Whether an answer is one this extension can show; another version of the server may know another form. */
export function isResults(answer: unknown): answer is Results {
  return typeof answer === "object" && answer !== null && (answer as { schema?: unknown }).schema === "results/1";
}

/** A choice out of a message; what is not text is left out. */
export function choiceOf(message: unknown): Choice {
  const of = (typeof message === "object" && message !== null ? message : {}) as Record<string, unknown>;
  const names = ["drive", "case", "gear", "station"].filter((name) => typeof of[name] === "string");
  return Object.fromEntries(names.map((name) => [name, of[name]])) as Choice;
}
