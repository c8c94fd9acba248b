// Curves as lists of places: reading one off, and its way over the picture.

import type { Place } from "../results";
import type { Scale } from "./scale";
import { round } from "./tree";

/** The value of a curve at a speed, straight between its places; none outside of it. */
export function valueAt(curve: readonly Place[], speed: number): number | undefined {
  const after = curve.findIndex(([at]) => at >= speed);
  const right = curve[after];
  if (right === undefined) {
    return undefined;
  }
  const left = curve[after - 1];
  if (right[0] === speed || left === undefined) {
    return right[0] === speed ? right[1] : undefined;
  }
  const share = (speed - left[0]) / (right[0] - left[0]);
  return left[1] + (right[1] - left[1]) * share;
}

/** Places in the picture. */
export type Way = readonly (readonly [x: number, y: number])[];

export function way(curve: readonly Place[], x: Scale, y: Scale): Way {
  return curve.filter((place) => place.every(Number.isFinite)).map(([speed, value]) => [x.at(speed), y.at(value)]);
}

/** What `points` of a polyline takes. */
export function written(places: Way): string {
  return places.map(([x, y]) => `${round(x)},${round(y)}`).join(" ");
}

/** From effort and speed in their units to power in its own: the factor that the curves themselves have. */
export function powerFactor(available: readonly Place[], power: readonly Place[]): number {
  let best = 0;
  let factor = 0;
  for (const [index, [speed, effort]] of available.entries()) {
    const size = Math.abs(speed * effort);
    const watts = power[index]?.[1];
    if (size > best && watts !== undefined) {
      best = size;
      factor = watts / (speed * effort);
    }
  }
  return factor;
}
