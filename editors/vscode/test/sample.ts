// A made-up answer of the server: a motor with a dip in its torque on a load that is met three times.

import type { Chart, OperatingPoint, Place, Results, Value } from "../src/results";

export function number(value: number, unit: string, more: Partial<Value> = {}): Value {
  return { type: "number", shown: `${value} ${unit}`, value, unit, ...more };
}

/** Torque of the motor in N·m at a speed in rpm: falls to a dip, rises to a hump, falls to nothing at 1500. */
export function motor(rpm: number): number {
  const slip = 1 - rpm / 1500;
  const dip = 26 * Math.exp(-(((rpm - 420) / 190) ** 2));
  return (2 * 75 * slip * 0.2) / (slip * slip + 0.04) + 34 * slip - dip;
}

/** Torque of the load. */
export function load(rpm: number): number {
  return 44 + 4e-6 * rpm * rpm;
}

const speeds = Array.from({ length: 109 }, (_, index) => index * 15);

/** Where both are equal, found by halving. */
function crossings(): number[] {
  const gap = (rpm: number) => motor(rpm) - load(rpm);
  return speeds.slice(1).flatMap((to) => {
    let [low, high] = [to - 15, to];
    if (gap(low) * gap(high) > 0) {
      return [];
    }
    for (let turn = 0; turn < 50; turn += 1) {
      const middle = (low + high) / 2;
      [low, high] = gap(low) * gap(middle) <= 0 ? [low, middle] : [middle, high];
    }
    return [Math.round(low * 10) / 10];
  });
}

const curve = (of: (rpm: number) => number): Place[] => speeds.map((rpm) => [rpm, of(rpm)]);
const kilowatts = (rpm: number, torque: number) => (rpm * torque * Math.PI) / 30_000;

export function chart(more: Partial<Chart> = {}): Chart {
  const found = crossings();
  const points = found.map((rpm, index): OperatingPoint => ({
    speed: number(rpm, "rpm"),
    effort: number(Math.round(load(rpm) * 100) / 100, "N·m"),
    stability: motor(rpm + 1) - load(rpm + 1) < motor(rpm - 1) - load(rpm - 1) ? "stable" : "unstable",
    mode: "motoring",
    reached: index === 0,
  }));
  return {
    speed: { kind: "rotational_speed", unit: "rpm" },
    effort: { kind: "torque", unit: "N·m" },
    power: { kind: "mechanical_power", unit: "kW" },
    available: curve(motor),
    required: curve(load),
    availablePower: curve((rpm) => kilowatts(rpm, motor(rpm))),
    points,
    continuous: number(47.2, "N·m"),
    measured: { low: number(0, "rpm"), high: number(1440, "rpm") },
    ...more,
  };
}

export function results(more: Partial<Results> = {}): Results {
  return {
    schema: "results/1",
    uri: "file:///specs/mill.shaft",
    version: 1,
    drive: { name: "mill", chain: "motor -> gear -> drum", underCursor: true, location: null },
    drives: ["mill", "fan"],
    cases: [
      { label: "plain", gear: null, changes: [], outcome: "stalls at 412 rpm", moves: false, speed: number(412, "rpm"), verdict: "fails" },
      { label: "weak[360 V]", gear: null, changes: ["mains.voltage = 360 V"], outcome: "runs up", moves: true, speed: number(1430, "rpm", { outside_data: true }), verdict: "holds" },
      { label: "weak[340 V]", gear: "2", changes: ["mains.voltage = 340 V"], outcome: "not solved", moves: false, speed: null, verdict: "not_judged" },
    ],
    case: 0,
    stations: [
      { part: "mains", role: "supply", kind: "mains" },
      { part: "motor", role: "source", kind: "induction_motor" },
      { part: "gear", role: "transmission", kind: "gear" },
      { part: "drum", role: "load", kind: "constant" },
    ],
    station: 1,
    chart: chart(),
    noChart: null,
    results: [
      { part: "", port: null, rows: [{ name: "speed", meaning: "speed of the drive", value: number(412, "rpm") }] },
      {
        part: "motor",
        port: null,
        rows: [
          { name: "peak_power", meaning: "greatest power along the curve", value: number(11.8, "kW") },
          { name: "mode", meaning: "what the source does", value: { type: "word", shown: "driven_back" } },
          { name: "current", meaning: "current", value: { type: "absent", shown: "–", reason: "no electrical data" } },
        ],
      },
      { part: "gear", port: "input", rows: [{ name: "torque", meaning: "torque at the input", value: number(31.4, "N·m") }] },
    ],
    criteria: [
      {
        clause: "M-1 speed",
        condition: "mill.speed >= 1400 rpm",
        required: "at least 1400 rpm",
        verdict: "fails",
        location: null,
        here: [{ case: "plain", verdict: "fails", found: number(412, "rpm"), margin: { shown: "−70.6 %" }, remark: null }],
        governing: { case: "plain", verdict: "fails", found: number(412, "rpm"), margin: { shown: "−70.6 %" }, remark: null },
      },
    ],
    ...more,
  };
}
