import { waterAtPressure } from "../../fluids/water-at-pressure";
import { fluidForEnergy } from "../../fluids/loop-fluid";
import { integrateEnergy } from "../../energy/integrate";
import { NO_CUT_OFFS, type PowerOptions } from "../../energy/power";
import { totalEnergy } from "../../energy/totals";
import { RowQuality, type ReadingColumns, type ReadingSegment } from "../reading-columns";
import { changedRows } from "./changed-rows";
import { correctClock, loggerInstantMs, trueInstantMs } from "./clock";
import { correctSegments, type SegmentCorrection } from "./correct-segments";
import { boreFactor } from "./scale-by-bore";

const minute = 60_000;
const always = { startMs: -Infinity, endMs: Infinity };
const cooling: PowerOptions = {
  fluid: waterAtPressure(1.6),
  meterSide: "return",
  service: "cooling",
  cutOffs: NO_CUT_OFFS,
};

function columns(count: number, from = 0): ReadingColumns {
  const column = (of: (row: number) => number) =>
    Float64Array.from({ length: count }, (_, i) => of(i));
  return {
    instantMs: column((i) => from + i * 5 * minute),
    flowM3PerHour: column(() => 28.8),
    supplyC: column(() => 6.9),
    returnC: column(() => 12.8),
    signalPercent: column((i) => 30 + i),
    quality: new Uint8Array(count),
  };
}

const segment = (given: Partial<ReadingSegment> = {}): ReadingSegment => ({
  kind: "instantaneous",
  nominalStepMs: 5 * minute,
  columns: columns(13),
  ...given,
});

const first = (segments: readonly ReadingSegment[]) => {
  const [found] = segments;
  if (!found) throw new Error("no segment");
  return found;
};
const coolingKwh = (segments: readonly ReadingSegment[]) =>
  totalEnergy(integrateEnergy(segments, cooling)).cooling.energyKwh;

/** One of each kind, over the middle of the hour. */
const span = { startMs: 10 * minute, endMs: 40 * minute };
const glycol = fluidForEnergy({ kind: "propyleneGlycol", percent: 30, basis: "mass" }, null);
const each: readonly SegmentCorrection[] = [
  { kind: "swapSides", span, swapped: "probes" },
  { kind: "probeOffset", span: { startMs: 0, endMs: 30 * minute }, side: "return", addK: 0.1 },
  { kind: "flipFlow", span: { startMs: 20 * minute, endMs: Infinity } },
  { kind: "scaleByBore", span, factor: boreFactor(102.26, 102.9651) },
  { kind: "exclude", span: { startMs: 15 * minute, endMs: 25 * minute }, rule: null },
  ...(glycol.ok ? [{ kind: "fluid" as const, span: { ...span, fluid: glycol.fluid } }] : []),
];

test("an hour of the worked interval is 197.798 kWh, and a bore of 102.9651 mm entered as 102.26 makes it 1.383 % more", () => {
  // (102.9651 / 102.26)² = 1.0138378: the flow of a surveyed pipe that a nominal bore was entered for.
  expect(boreFactor(102.26, 102.9651)).toBeCloseTo(1.0138378, 6);
  const scaled = correctSegments(
    [segment()],
    [{ kind: "scaleByBore", span: always, factor: boreFactor(102.26, 102.9651) }],
  );
  expect(coolingKwh([segment()])).toBeCloseTo(197.798, 3);
  expect(coolingKwh(scaled)).toBeCloseTo(197.798 * 1.0138378, 2);
});

test("swapped sides turn cooling into heating, and swapped again give the original bits", () => {
  const swap = { kind: "swapSides", span: always, swapped: "probes" } as const;
  const once = correctSegments([segment()], [swap]);
  expect(coolingKwh(once)).toBe(0);
  expect(first(once).columns.supplyC?.[4]).toBe(12.8);
  const twice = correctSegments(once, [swap]);
  expect(first(twice).columns).toEqual(segment().columns);
});

test("an offset goes with its probe to the side the swapped readings end up on", () => {
  const offset = { kind: "probeOffset", span: always, side: "supply", addK: 0.1 } as const;
  const probes = { kind: "swapSides", span: always, swapped: "probes" } as const;
  const { supplyC, returnC } = first(correctSegments([segment()], [offset, probes])).columns;
  // The probe recorded on supply read 6.9 °C; it sat on the return pipe.
  expect([supplyC?.[0], returnC?.[0]]).toEqual([12.8, 7.0]);
  const channels = { ...probes, swapped: "channels" } as const;
  const named = first(correctSegments([segment()], [offset, channels])).columns;
  // The probe sat on supply, as recorded; its readings stood in the return channel.
  expect([named.supplyC?.[0], named.returnC?.[0]]).toEqual([12.9, 6.9]);
});

test("an offset over the edge of a swap lands on one side before it and on the other after", () => {
  const offset = { kind: "probeOffset", span: always, side: "supply", addK: 1 } as const;
  const swap = {
    kind: "swapSides",
    span: { startMs: 30 * minute, endMs: Infinity },
    swapped: "probes",
  } as const;
  const { supplyC, returnC } = first(correctSegments([segment()], [swap, offset])).columns;
  expect([supplyC?.[5], returnC?.[5]]).toEqual([7.9, 12.8]);
  expect([supplyC?.[6], returnC?.[6]]).toEqual([12.8, 7.9]);
});

test("a channel one file lacks is swapped for the stretch only, and comes back", () => {
  const alone = segment({ columns: { ...columns(13), returnC: null } });
  const swap = { kind: "swapSides", span, swapped: "channels" } as const;
  const once = first(correctSegments([alone], [swap])).columns;
  expect([once.supplyC?.[1], once.supplyC?.[2], once.returnC?.[2]]).toEqual([6.9, NaN, 6.9]);
  const twice = first(correctSegments([{ ...alone, columns: once }], [swap])).columns;
  expect(twice.supplyC).toEqual(alone.columns.supplyC);
});

test("flow against the arrow counts in the other register once its sign is turned", () => {
  const against = segment();
  against.columns.flowM3PerHour?.fill(-28.8);
  expect(coolingKwh([against])).toBe(0);
  const flipped = correctSegments([against], [{ kind: "flipFlow", span: always }]);
  expect(coolingKwh(flipped)).toBeCloseTo(197.798, 3);
});

test("an exclusion takes its rows' time away and leaves their values readable", () => {
  const excluded = correctSegments([segment()], [{ kind: "exclude", span, rule: null }]);
  const { quality, flowM3PerHour } = first(excluded).columns;
  expect([...quality]).toEqual([0, 0, 1, 1, 1, 1, 1, 1, 0, 0, 0, 0, 0]);
  expect(flowM3PerHour?.[3]).toBe(28.8);
  // 6 rows out: 5 of the 12 steps of five minutes are left.
  expect(coolingKwh(excluded)).toBeCloseTo((197.798 * 5) / 12, 3);
});

test("a rule leaves out only rows beyond its bound, by corrected values, and never revives a row", () => {
  const given = segment();
  given.columns.quality[0] = RowQuality.noReading;
  const rule = { channel: "signal", is: "below", value: 35 } as const;
  const weak = correctSegments([given], [{ kind: "exclude", span: always, rule }]);
  expect([...first(weak).columns.quality]).toEqual([2, 1, 1, 1, 1, 0, 0, 0, 0, 0, 0, 0, 0]);
  const small = { channel: "deltaT", is: "below", value: 6 } as const;
  const rest = { kind: "exclude", span: always, rule: small } as const;
  expect(changedRows([segment()], correctSegments([segment()], [rest]), null)).toBe(13);
  const warmer = { kind: "probeOffset", span: always, side: "return", addK: 0.2 } as const;
  const both = first(correctSegments([segment()], [rest, warmer]));
  expect([...both.columns.quality]).toEqual(Array.from({ length: 13 }, () => 0));
});

test("a mean labelled with its end belongs to the time before its label", () => {
  const means = segment({ kind: "meanToLabel" });
  const { quality } = first(
    correctSegments(
      [means],
      [{ kind: "exclude", span: { startMs: 0, endMs: 10 * minute }, rule: null }],
    ),
  ).columns;
  expect([...quality.slice(0, 4)]).toEqual([0, 1, 1, 0]);
});

test("a stretch of glycol is worked out as glycol and the steps to water stay steps", () => {
  if (!glycol.ok) throw new Error("30 % is within the tables");
  const part = { ...span, fluid: glycol.fluid };
  const mixed = correctSegments([segment()], [{ kind: "fluid", span: part }]);
  const covered = totalEnergy(integrateEnergy(mixed, cooling));
  const whole = coolingKwh(
    correctSegments([segment()], [{ kind: "fluid", span: { ...always, fluid: glycol.fluid } }]),
  );
  expect(covered.coveredS).toBe(3600);
  // Rows of 10 to 35 minutes are glycol: half an hour's weight, by halves of steps at both edges.
  expect(covered.cooling.energyKwh).toBeCloseTo((197.798 + whole) / 2, 3);
  // 30 % by mass carries about 6 % less at 12/6 °C than water.
  expect(whole / 197.798).toBeCloseTo(0.94, 2);
  expect(changedRows([segment()], mixed, cooling.fluid)).toBe(6);
});

test("no correction loses, adds or moves a row, and the readings given stay as they are", () => {
  const given = segment();
  for (const correction of each) {
    const after = first(correctSegments([given], [correction]));
    expect(after.columns.instantMs).toEqual(given.columns.instantMs);
    expect(changedRows([given], [after], cooling.fluid)).toBeGreaterThan(0);
  }
  // Withdrawn again: what was read is there, bit for bit.
  expect(given.columns).toEqual(columns(13));
  expect(correctSegments([given], [])).toEqual([given]);
});

test("corrections of different kinds give the same readings in whatever order they were made", () => {
  let state = 3;
  const random = () => (state = (state * 48_271) % 2_147_483_647) / 2_147_483_647;
  const expected = correctSegments([segment()], each);
  for (let turn = 0; turn < 40; turn++) {
    const mixed = each
      .map((correction) => ({ correction, at: random() }))
      .sort((a, b) => a.at - b.at)
      .map(({ correction }) => correction);
    expect(correctSegments([segment()], mixed)).toEqual(expected);
  }
});

test("a slow clock that loses two seconds a day is put right, and the way back finds the row", () => {
  const day = 86_400_000;
  const error = { offsetMs: 90_000, driftPerMs: 2000 / day, referenceMs: 0 };
  expect(trueInstantMs(day, error)).toBe(day + 92_000);
  expect(loggerInstantMs(day + 92_000, error)).toBeCloseTo(day, 3);
  const corrected = correctClock(columns(3), error);
  expect([...corrected.instantMs]).toEqual([90_000, 390_007, 690_014]);
  expect(corrected.flowM3PerHour).toEqual(columns(3).flowM3PerHour);
});

test("a clock that gains an hour a day keeps rows a millisecond apart in their order", () => {
  const close = { ...columns(50), instantMs: Float64Array.from({ length: 50 }, (_, i) => i) };
  const { instantMs } = correctClock(close, {
    offsetMs: 0,
    driftPerMs: -3600 / 86_400,
    referenceMs: 0,
  });
  instantMs.forEach((at, i) => expect(at).toBeGreaterThan(instantMs[i - 1] ?? -Infinity));
});
