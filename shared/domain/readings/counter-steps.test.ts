import { readFileSync } from "node:fs";
import path from "node:path";
import * as fc from "fast-check";
import {
  counterCapacity,
  counterMeans,
  counterStep,
  NO_COUNTER_FACTS,
  type CounterFacts,
} from "./counter-steps";
import { RowQuality, type ReadingColumns } from "./reading-columns";

const QUARTER = 900_000;
const T0 = Date.UTC(2026, 4, 18);

interface Cell {
  readonly id: string;
  readonly register?: readonly number[];
  readonly capacity?: number;
  readonly deltas?: readonly number[];
  readonly flag?: string;
}
const cells = JSON.parse(
  readFileSync(path.join(__dirname, "../../../test/fixtures/import-cells.json"), "utf8"),
) as readonly Cell[];

function rows(counter: readonly number[], more: Partial<ReadingColumns> = {}): ReadingColumns {
  return {
    instantMs: Float64Array.from(counter, (_, i) => T0 + i * QUARTER),
    flowM3PerHour: null,
    supplyC: null,
    returnC: null,
    signalPercent: null,
    volumeCounterM3: Float64Array.from(counter),
    quality: new Uint8Array(counter.length),
    ...more,
  };
}
function facts(
  capacity: number | null,
  mostPerHour: number | null,
  more: Partial<CounterFacts> = {},
): CounterFacts {
  const volume = { capacity, mostPerHour };
  return { ...NO_COUNTER_FACTS, volume, gapFactor: 3, ...more };
}
const flowOf = (columns: ReadingColumns) => [...(columns.flowM3PerHour ?? [])];

test("the register of the worked cell rolls over with steps of 1.4 and 1.3", () => {
  const cell = cells.find(({ id }) => id === "B07");
  if (!cell?.register || !cell.deltas) throw new Error("the fixture has no register cell");
  const { columns, events } = counterMeans(
    rows(cell.register),
    "instantaneous",
    QUARTER,
    facts(cell.capacity ?? null, 50),
  );
  const [first, ...steps] = flowOf(columns);
  expect(first).toBeNaN();
  steps.forEach((flow, i) => expect(flow / 4).toBeCloseTo(cell.deltas?.[i] ?? NaN, 9));
  expect(events).toMatchObject([{ kind: cell.flag, before: 9999.6, after: 0.9 }]);
  expect([...columns.quality]).toEqual([
    RowQuality.opening,
    RowQuality.measured,
    RowQuality.measured,
  ]);
});

test("a fall is a reset where the capacity is unknown, the maximum is unknown or the step too large", () => {
  const reset = { passed: null, event: "reset" };
  expect(counterStep(9999.6, 0.9, 0.25, { capacity: null, mostPerHour: 50 })).toEqual(reset);
  expect(counterStep(9999.6, 0.9, 0.25, { capacity: 10_000, mostPerHour: null })).toEqual(reset);
  expect(counterStep(9999.6, 0.9, 0.25, { capacity: 10_000, mostPerHour: 5 })).toEqual(reset);
  expect(counterStep(20, 5, 0.25, { capacity: 10_000, mostPerHour: 50 })).toEqual(reset);
  // A counter beyond its capacity was not read right.
  expect(counterStep(10_020, 0, 0.25, { capacity: 10_000, mostPerHour: 50 })).toEqual(reset);
});

test("a rise that the pipe cannot move is another meter", () => {
  const limits = { capacity: null, mostPerHour: 50 };
  expect(counterStep(10, 22.5, 0.25, limits)).toEqual({ passed: 12.5, event: null });
  expect(counterStep(10, 23, 0.25, limits)).toEqual({ passed: null, event: "jump" });
  expect(counterStep(10, 9e6, 0.25, { ...limits, mostPerHour: null }).passed).toBe(9e6 - 10);
});

test("a display of nines starts again one digit later; any other number is the capacity", () => {
  expect([9999, 99_999.99, 999_999.999, 10_000, 65_536].map(counterCapacity)).toEqual([
    10_000, 100_000, 1_000_000, 10_000, 65_536,
  ]);
  expect([0, -5, NaN, Infinity].map(counterCapacity)).toEqual([null, null, null, null]);
});

test("a reset and an exchange leave their step unknown, and the next step counts again", () => {
  const { columns, events } = counterMeans(
    rows([10, 12, 3, 4, 6, 7]),
    "instantaneous",
    QUARTER,
    facts(null, null, { exchangesMs: [T0 + 3.5 * QUARTER] }),
  );
  expect(flowOf(columns)).toEqual([NaN, 8, NaN, 4, NaN, 4]);
  expect(events.map(({ kind }) => kind)).toEqual(["reset", "exchange"]);
  expect([...columns.quality]).toEqual([3, 0, 2, 0, 2, 0]);
});

test("a step over a gap opens anew instead of spreading what passed over it", () => {
  const instantMs = Float64Array.from([0, 1, 5, 6], (i) => T0 + i * QUARTER);
  const source = rows([0, 1, 5, 6], { instantMs });
  const survey = counterMeans(source, "instantaneous", QUARTER, facts(null, null));
  expect(flowOf(survey.columns)).toEqual([NaN, 4, NaN, 4]);
  expect([...survey.columns.quality]).toEqual([3, 0, 3, 0]);
});

test("temperatures beside a counter are brought to its step by what they are", () => {
  const supplyC = Float64Array.of(10, 12, 20);
  const source = rows([0, 1, 2], { supplyC });
  const on = (kind: "instantaneous" | "meanFromLabel" | "meanToLabel") => [
    ...(counterMeans(source, kind, QUARTER, facts(null, null)).columns.supplyC ?? []),
  ];
  expect(on("instantaneous")).toEqual([NaN, 11, 16]);
  expect(on("meanFromLabel")).toEqual([NaN, 10, 12]);
  expect(on("meanToLabel")).toEqual([10, 12, 20]);
});

test("a row whose heating or cooling counter is unknown says nothing of either", () => {
  const source = rows([0, 0, 0], {
    volumeCounterM3: null,
    heatingCounterKwh: Float64Array.of(5, 6, 7),
    coolingCounterKwh: Float64Array.of(5, 4, 6),
  });
  const { columns } = counterMeans(source, "instantaneous", QUARTER, facts(null, null));
  expect([...(columns.heatingKw ?? [])]).toEqual([NaN, NaN, 4]);
  expect([...(columns.coolingKw ?? [])]).toEqual([NaN, NaN, 8]);
});

const steps = fc.array(fc.double({ min: 0, max: 12.5, noNaN: true }), {
  minLength: 1,
  maxLength: 60,
});

test("whatever a counter starts at and however often it rolls over, its steps come back", () => {
  fc.assert(
    fc.property(steps, fc.double({ min: 0, max: 99, noNaN: true }), (passed, start) => {
      let total = start;
      const counter = [start % 100, ...passed.map((step) => (total += step) % 100)];
      const { columns, events } = counterMeans(
        rows(counter),
        "instantaneous",
        QUARTER,
        facts(100, 50.001),
      );
      flowOf(columns)
        .slice(1)
        .forEach((flow, i) => expect(Math.abs(flow / 4 - (passed[i] ?? NaN))).toBeLessThan(1e-9));
      expect(events.every(({ kind }) => kind === "rollover")).toBe(true);
    }),
    { numRuns: 200 },
  );
});

test("no counter ever gives a negative flow, and unknown steps are as many as listed", () => {
  const any = fc.array(fc.double({ min: 0, max: 1000, noNaN: true }), {
    minLength: 2,
    maxLength: 60,
  });
  fc.assert(
    fc.property(any, fc.boolean(), (counter, bounded) => {
      const limits = bounded ? facts(1000, 400) : facts(null, null);
      const { columns, events } = counterMeans(rows(counter), "instantaneous", QUARTER, limits);
      const flows = flowOf(columns).slice(1);
      expect(flows.filter((flow) => flow < 0)).toEqual([]);
      const unknown = flows.filter((flow) => Number.isNaN(flow)).length;
      expect(events.filter(({ kind }) => kind !== "rollover")).toHaveLength(unknown);
    }),
    { numRuns: 200 },
  );
});
