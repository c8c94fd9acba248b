// Where a label stands: beside what it names, clear of the curves and of the other labels.

import type { Way } from "./curve";

export interface Box {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

export type Anchor = "start" | "middle" | "end";

export interface Label {
  readonly text: string;
  readonly x: number;
  /** The line the letters stand on. */
  readonly y: number;
  readonly anchor: Anchor;
  readonly box: Box;
}

/** Size of the letters of a chart. */
export const LETTERS = 12;
/** Width of a letter, on the safe side for the fonts of editors. */
const LETTER = 0.56 * LETTERS;

/** Width of a text, nearly. */
export function widthOf(text: string): number {
  return [...text].length * LETTER;
}

export function label(text: string, x: number, y: number, anchor: Anchor): Label {
  const width = widthOf(text);
  const left = x - (anchor === "start" ? 0 : anchor === "end" ? width : width / 2);
  return { text, x, y, anchor, box: { left, top: y - 0.8 * LETTERS, right: left + width, bottom: y + 0.25 * LETTERS } };
}

export function overlap(a: Box, b: Box): number {
  const across = Math.min(a.right, b.right) - Math.max(a.left, b.left);
  const down = Math.min(a.bottom, b.bottom) - Math.max(a.top, b.top);
  return across > 0 && down > 0 ? across * down : 0;
}

/** What labels have to keep clear of. */
export interface Surroundings {
  readonly inside: Box;
  readonly curves: readonly Way[];
  readonly boxes: readonly Box[];
}

/** How bad a place is: over the edge is worst, then over another label, then across a curve. */
function cost(candidate: Label, around: Surroundings): number {
  const { box } = candidate;
  const { inside } = around;
  const over =
    Math.max(0, inside.left - box.left) +
    Math.max(0, inside.top - box.top) +
    Math.max(0, box.right - inside.right) +
    Math.max(0, box.bottom - inside.bottom);
  const boxes = around.boxes.reduce((sum, other) => sum + overlap(box, other), 0);
  const crossings = around.curves.reduce((sum, curve) => sum + lengthIn(curve, box), 0);
  return 100 * over + 10 * boxes + 8 * crossings;
}

/** How much of a curve lies in a box. */
export function lengthIn(curve: Way, box: Box): number {
  let sum = 0;
  for (let index = 1; index < curve.length; index += 1) {
    const [x0, y0] = curve[index - 1] ?? [0, 0];
    const [x1, y1] = curve[index] ?? [0, 0];
    let [from, to] = [0, 1];
    for (const [start, step, low, high] of [
      [x0, x1 - x0, box.left, box.right],
      [y0, y1 - y0, box.top, box.bottom],
    ] as const) {
      if (step === 0) {
        if (start < low || start > high) {
          to = -1;
        }
        continue;
      }
      const [a, b] = [(low - start) / step, (high - start) / step];
      from = Math.max(from, Math.min(a, b));
      to = Math.min(to, Math.max(a, b));
    }
    sum += to > from ? (to - from) * Math.hypot(x1 - x0, y1 - y0) : 0;
  }
  return sum;
}

/** The best of some places; of equals the first. */
export function best(candidates: readonly Label[], around: Surroundings): Label | undefined {
  let found: Label | undefined;
  let least = Infinity;
  for (const candidate of candidates) {
    const price = cost(candidate, around);
    if (price < least) {
      [found, least] = [candidate, price];
    }
  }
  return found;
}

/** Places beside a curve, from its middle outward, close by before farther off. */
export function besideCurve(text: string, curve: Way, inside: Box): Label[] {
  const seen = curve.filter(([x, y]) => x >= inside.left && x <= inside.right && y >= inside.top && y <= inside.bottom);
  const out: Label[] = [];
  for (const off of [6, 12, 20]) {
    for (const share of [0.5, 0.4, 0.6, 0.3, 0.7, 0.2, 0.8, 0.12, 0.88, 0.04, 0.96]) {
      const place = seen[Math.round(share * (seen.length - 1))];
      if (place !== undefined) {
        const [x, y] = place;
        out.push(
          label(text, x, y - off, "middle"),
          label(text, x, y + off + 0.7 * LETTERS, "middle"),
          label(text, x + off, y - 2, "start"),
          label(text, x - off, y - 2, "end"),
          label(text, x + off, y + 0.7 * LETTERS, "start"),
          label(text, x - off, y + 0.7 * LETTERS, "end"),
        );
      }
    }
  }
  return out;
}

/** Places around a point. */
export function aroundPoint(text: string, x: number, y: number): Label[] {
  return [10, 16, 26].flatMap((off) => [
    label(text, x + off, y - off + 4, "start"),
    label(text, x - off, y - off + 4, "end"),
    label(text, x + off, y + off + 4, "start"),
    label(text, x - off, y + off + 4, "end"),
    label(text, x, y - off - 2, "middle"),
    label(text, x, y + off + 0.7 * LETTERS, "middle"),
    label(text, x + off + 2, y + 4, "start"),
    label(text, x - off - 2, y + 4, "end"),
  ]);
}
