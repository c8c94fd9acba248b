// Numbers along an axis, curves read off, and the factor from torque to power.

import assert from "node:assert/strict";
import { test } from "node:test";

import type { Place } from "../src/results";
import { powerFactor, valueAt, way, written } from "../src/view/curve";
import { digits, scale, ticks } from "../src/view/scale";

test("round numbers, both ends included, no more than asked", () => {
  assert.deepEqual(ticks(0, 1620, 8), [0, 500, 1000, 1500]);
  assert.deepEqual(ticks(0, 10, 5), [0, 2, 4, 6, 8, 10]);
  assert.deepEqual(ticks(-0.3, 0.3, 6), [-0.3, -0.2, -0.1, 0, 0.1, 0.2, 0.3]);
  assert.deepEqual(ticks(0, 3e-7, 3), [0, 1e-7, 2e-7, 3e-7]);
});

test("ticks of any range are few, rising, inside, and evenly apart", () => {
  for (let index = 0; index < 2000; index += 1) {
    const size = (1 + (index % 17)) * 0.37 * 10 ** ((index % 13) - 6);
    const low = size * ((index % 7) - 4) * 1.37;
    const high = low + size;
    const found = ticks(low, high, 6);
    assert.ok(found.length >= 1 && found.length <= 8, `${low} ${high}: ${found}`);
    const slack = (high - low) * 1e-6;
    assert.ok(found.every((value, at) => value >= low - slack && value <= high + slack && (at === 0 || value > (found[at - 1] ?? value))));
  }
  assert.deepEqual(ticks(5, 5, 4), [5]);
  assert.deepEqual(ticks(0, Infinity, 4), [0]);
});

test("places and values go both ways", () => {
  const along = scale(-10, 30, 50, 250);
  assert.equal(along.at(-10), 50);
  assert.equal(along.at(30), 250);
  assert.equal(along.of(along.at(7)), 7);
  assert.ok(Number.isFinite(scale(4, 4, 0, 100).at(4)), "a range of nothing divides by nothing");
});

test("numbers as a reader writes them", () => {
  assert.equal(digits(1447.123), "1447");
  assert.equal(digits(0.5), "0.5");
  assert.equal(digits(-0.25), "−0.25");
  assert.equal(digits(0), "0");
  assert.equal(digits(1e7), "1e7");
  assert.equal(digits(NaN), "");
});

const line: Place[] = [[0, 10], [100, 20], [100, 5], [200, 5]];

test("a curve is read off between its places, and not outside", () => {
  assert.equal(valueAt(line, 50), 15);
  assert.equal(valueAt(line, 0), 10);
  assert.equal(valueAt(line, 150), 5);
  assert.equal(valueAt(line, -1), undefined);
  assert.equal(valueAt(line, 201), undefined);
  assert.equal(valueAt([], 0), undefined);
});

test("what is no number is not drawn", () => {
  const x = scale(0, 200, 0, 200);
  assert.equal(written(way([[0, 1], [50, NaN], [100, 2.04]], x, scale(0, 10, 0, 10))), "0,1 100,2");
});

test("from torque to power by the curves themselves", () => {
  const torque: Place[] = [[0, 0], [1000, 40], [1500, 20]];
  const power: Place[] = torque.map(([rpm, nm]) => [rpm, (rpm * nm * Math.PI) / 30_000]);
  assert.ok(Math.abs(powerFactor(torque, power) - Math.PI / 30_000) < 1e-12);
  assert.equal(powerFactor([], []), 0);
});
