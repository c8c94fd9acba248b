// From values to places, and round numbers along an axis.

/** A straight scale from values to places. */
export interface Scale {
  readonly low: number;
  readonly high: number;
  /** The place of a value. */
  at(value: number): number;
  /** The value at a place. */
  of(place: number): number;
}

export function scale(low: number, high: number, from: number, to: number): Scale {
  const size = high - low || 1;
  return {
    low,
    high,
    at: (value) => from + ((value - low) / size) * (to - from),
    of: (place) => low + ((place - from) / (to - from || 1)) * size,
  };
}

/** Round numbers between two values, at most `most` of them (at least two). */
export function ticks(low: number, high: number, most: number): number[] {
  const size = high - low;
  if (!(size > 0) || !Number.isFinite(size)) {
    return [low];
  }
  const least = size / Math.max(1, most);
  const power = 10 ** Math.floor(Math.log10(least));
  const step = power * ([1, 2, 5, 10].find((times) => times * power >= least * (1 - 1e-9)) ?? 10);
  const first = Math.ceil(low / step - 1e-9);
  const last = Math.floor(high / step + 1e-9);
  return Array.from({ length: last - first + 1 }, (_, index) => {
    // What is left of zero after the division is not a number to show.
    const value = (first + index) * step;
    return Math.abs(value) < step * 1e-9 ? 0 : Number(value.toPrecision(12));
  });
}

/** A number with so many significant digits, no zeros behind the point that say nothing, and a true minus sign. */
export function digits(value: number, significant = 4): string {
  if (!Number.isFinite(value)) {
    return "";
  }
  if (value === 0) {
    return "0";
  }
  const rounded = Number(value.toPrecision(significant));
  const size = Math.abs(rounded);
  const text = size >= 1e6 || size < 1e-4 ? rounded.toExponential() : String(rounded);
  return text.replace(/-/g, "−").replace("e+", "e");
}
