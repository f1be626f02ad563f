import { alignTemperatures } from "./align-temperatures";
import { coverage, gaps } from "./coverage";
import { nominalStepMs } from "./nominal-step";
import { RowQuality, type ReadingColumns } from "./reading-columns";

const T0 = Date.UTC(2026, 4, 14);
const minute = 60_000;
const at = (...minutes: number[]) => Float64Array.from(minutes, (m) => T0 + m * minute);

function columns(instantMs: Float64Array, flow = 10): ReadingColumns {
  return {
    instantMs,
    flowM3PerHour: new Float64Array(instantMs.length).fill(flow),
    supplyC: new Float64Array(instantMs.length).fill(6),
    returnC: new Float64Array(instantMs.length).fill(12),
    signalPercent: null,
    quality: new Uint8Array(instantMs.length),
  };
}

test("the nominal step is the usual one, whatever the gaps and the jitter", () => {
  expect(nominalStepMs(at(0, 1, 2, 60, 61, 62))).toBe(minute);
  expect(nominalStepMs(at(0, 1.01, 2, 2.99, 4, 300))! / minute).toBeCloseTo(1, 1);
  expect(nominalStepMs(at(0))).toBeNull();
});

test("a step over three nominal ones is a gap with the rows it lacks, three is not", () => {
  expect(gaps(columns(at(0, 1, 2, 5, 6)), minute)).toEqual([]);
  expect(gaps(columns(at(0, 1, 2, 6, 7)), minute)).toEqual([
    {
      fromMs: T0 + 2 * minute,
      toMs: T0 + 6 * minute,
      missingRows: 3,
      flowBeforeM3PerHour: 10,
      flowAfterM3PerHour: 10,
    },
  ]);
});

test("coverage leaves out gaps and excluded rows, and is counted against what was asked for", () => {
  const rows = columns(at(0, 1, 2, 3, 20, 21, 22));
  const whole = { startMs: T0, endMs: T0 + 30 * minute };
  const segment = { kind: "instantaneous", nominalStepMs: minute, columns: rows } as const;
  expect(coverage([segment], whole)).toEqual({
    coveredMs: 5 * minute,
    expectedMs: 30 * minute,
    completeness: 5 / 30,
  });
  rows.quality[1] = RowQuality.excluded;
  expect(coverage([segment], whole).coveredMs).toBe(3 * minute);
  const half = { startMs: T0 + 2.5 * minute, endMs: T0 + 20.5 * minute };
  expect(coverage([segment], half).coveredMs).toBe(minute);
});

describe("temperatures at the flow's instants", () => {
  const series = (instantMs: Float64Array, values: number[], quality: number[] | null = null) => ({
    instantMs,
    temperatureC: Float64Array.from(values),
    quality: quality && Uint8Array.from(quality),
    nominalStepMs: 5 * minute,
  });

  test("lie on the straight line between two readings and are exact on a reading", () => {
    const aligned = alignTemperatures(at(0, 1, 5, 7.5), series(at(0, 5, 10), [20, 21, 25]));
    expect([...aligned]).toEqual([20, 20.2, 21, 23]);
  });

  test("bridge one missing reading, never two", () => {
    expect([...alignTemperatures(at(5), series(at(0, 10), [20, 22]))]).toEqual([21]);
    expect([...alignTemperatures(at(5), series(at(0, 15), [20, 23]))]).toEqual([NaN]);
  });

  test("are never carried beyond the first or the last reading", () => {
    expect([...alignTemperatures(at(-1, 11), series(at(0, 5, 10), [20, 21, 22]))]).toEqual([
      NaN,
      NaN,
    ]);
  });

  test("do not use readings that are missing or excluded", () => {
    const missing = series(at(0, 5, 10), [20, NaN, 22]);
    expect([...alignTemperatures(at(5), missing)]).toEqual([21]);
    const excluded = series(at(0, 5, 10, 15), [20, 99, 98, 23], [0, 1, 1, 0]);
    expect([...alignTemperatures(at(2, 5), excluded)]).toEqual([NaN, NaN]);
  });
});
