import { Random } from "@test/generators/random";
import type { ReadingSegment } from "../reading-columns";
import { stepChanges } from "./step-change";

const STEP_MS = 600_000;

/** Three weeks of ten minutes with daily load, still pumps, holes and probes that were moved. */
function segmentOf(seed: number): ReadingSegment {
  const random = new Random(seed);
  const count = 3024;
  const startMs = Date.UTC(2025, 5, 2);
  const moves = Array.from({ length: 4 }, () => ({
    row: Math.floor(random.next() * count),
    flow: 1 + (random.next() - 0.5) / 2,
    supplyK: (random.next() - 0.5) * 2,
    returnK: (random.next() - 0.5) * 3,
  }));
  const offFrom = Math.floor(random.next() * count);
  const offRows = Math.floor(random.next() * 600);
  const flow = new Float64Array(count);
  const supply = new Float64Array(count);
  const back = new Float64Array(count);
  const instantMs = new Float64Array(count);
  const quality = new Uint8Array(count);
  let atMs = startMs;
  for (let i = 0; i < count; i++) {
    atMs += random.next() < 0.002 ? 40 * STEP_MS : STEP_MS;
    instantMs[i] = atMs;
    const day = Math.sin((atMs / 86_400_000) * 2 * Math.PI);
    const done = moves.filter(({ row }) => i >= row);
    const isOff = i >= offFrom && i < offFrom + offRows;
    flow[i] = isOff ? 0 : (28 + 6 * day + random.next()) * done.reduce((f, m) => f * m.flow, 1);
    supply[i] = 6.4 + random.next() / 20 + done.reduce((k, m) => k + m.supplyK, 0);
    back[i] = 12 + day / 2 + random.next() / 20 + done.reduce((k, m) => k + m.returnK, 0);
    if (random.next() < 0.01) supply[i] = NaN;
    if (random.next() < 0.01) quality[i] = 1;
  }
  const columns = {
    instantMs,
    flowM3PerHour: flow,
    supplyC: supply,
    returnC: back,
    signalPercent: null,
    quality,
  };
  return { kind: "instantaneous", nominalStepMs: STEP_MS, columns };
}

test("steps found a few rows at a time are those found in all rows at once", () => {
  let found = 0;
  for (let seed = 1; seed <= 30; seed++) {
    const segment = segmentOf(seed);
    const limits = { boreMm: 100 };
    const whole = stepChanges(segment, limits, Infinity);
    found += whole.length;
    for (const rowsAtOnce of [150, 1001])
      expect(stepChanges(segment, limits, rowsAtOnce)).toEqual(whole);
  }
  expect(found).toBeGreaterThan(8);
});
