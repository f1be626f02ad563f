import * as fc from "fast-check";
import { integrateEnergy, type IntegrationOptions } from "@shared/domain/energy/integrate";
import { NO_CUT_OFFS } from "@shared/domain/energy/power";
import { totalEnergy, type EnergyTotals } from "@shared/domain/energy/totals";
import { waterAtPressure } from "@shared/domain/fluids/water-at-pressure";
import { fromCelsius, toCelsius } from "@shared/domain/units/temperature";
import { fromM3PerHour, toM3PerHour } from "@shared/domain/units/flow";
import { fromKw, toKw } from "@shared/domain/units/energy-and-power";
import type { ReadingColumns, SeriesKind } from "@shared/domain/readings/reading-columns";
import { resolveSegments, type ReadingSource } from "@shared/domain/readings/resolve-segments";

const T0 = Date.UTC(2026, 4, 14, 0, 3);
const NOMINAL = 300_000;
const options: IntegrationOptions = {
  fluid: waterAtPressure(1.6),
  meterSide: "supply",
  service: "changeover",
  cutOffs: { flowM3PerHour: 1, deltaTK: 0.5 },
};

interface Row {
  readonly stepMs: number;
  readonly flow: number;
  readonly supply: number;
  readonly back: number;
  readonly quality: number;
}
const row: fc.Arbitrary<Row> = fc.record({
  // Up to five nominal steps: some are gaps.
  stepMs: fc.integer({ min: 1_000, max: 5 * NOMINAL }),
  flow: fc.double({ min: 0, max: 120, noNaN: true }),
  supply: fc.double({ min: 3, max: 90, noNaN: true }),
  back: fc.double({ min: 3, max: 90, noNaN: true }),
  quality: fc.constantFrom(0, 0, 0, 0, 0, 1, 2),
});
const kind = fc.constantFrom<SeriesKind>("instantaneous", "meanFromLabel", "meanToLabel");
const rowsOf = fc.array(row, { minLength: 2, maxLength: 40 });

function toColumns(rows: readonly Row[], order: readonly number[]): ReadingColumns {
  let at = T0;
  const instants = rows.map(({ stepMs }) => (at += stepMs));
  const pick = (of: (index: number) => number) => Float64Array.from(order, of);
  return {
    instantMs: pick((i) => instants[i]!),
    flowM3PerHour: pick((i) => rows[i]!.flow),
    supplyC: pick((i) => rows[i]!.supply),
    returnC: pick((i) => rows[i]!.back),
    signalPercent: null,
    quality: Uint8Array.from(order, (i) => rows[i]!.quality),
  };
}
const inOrder = (rows: readonly Row[]) => rows.map((_, i) => i);

function energy(sources: ReadingSource[], changed: Partial<IntegrationOptions> = {}): EnergyTotals {
  return totalEnergy(integrateEnergy(resolveSegments(sources), { ...options, ...changed }));
}
function asSource(columns: ReadingColumns, seriesKind: SeriesKind, precedence = 0): ReadingSource {
  return { precedence, kind: seriesKind, nominalStepMs: NOMINAL, columns };
}
function sums(totals: EnergyTotals): number[] {
  const { heating, cooling, volumeM3, coveredS, suppressedKwh } = totals;
  return [heating, cooling]
    .flatMap((r) => [r.energyKwh, r.volumeM3, r.flowDeltaTM3K, r.powerDeltaTKwhK, r.runningS])
    .concat(volumeM3, coveredS, suppressedKwh);
}
function expectClose(own: readonly number[], expected: readonly number[]): void {
  own.forEach((value, i) => {
    const scale = Math.max(1, Math.abs(expected[i]!));
    expect(Math.abs(value - expected[i]!) / scale).toBeLessThan(1e-9);
  });
}

test("energy is additive over any split of the time axis", () => {
  fc.assert(
    fc.property(rowsOf, kind, fc.double({ min: 0, max: 1, noNaN: true }), (rows, k, share) => {
      const source = asSource(toColumns(rows, inOrder(rows)), k);
      const end = source.columns.instantMs[rows.length - 1]!;
      const cutMs = Math.round(T0 + share * (end - T0));
      const before = energy([source], { window: { startMs: -Infinity, endMs: cutMs } });
      const after = energy([source], { window: { startMs: cutMs, endMs: Infinity } });
      const whole = energy([source]);
      expectClose(
        sums(before).map((value, i) => value + sums(after)[i]!),
        sums(whole),
      );
      expect(before.measuredRows + after.measuredRows).toBe(whole.measuredRows);
    }),
    { numRuns: 80 },
  );
});

test("the order of rows and how they are spread over files change nothing", () => {
  const spread = rowsOf.chain((rows) =>
    fc.record({
      rows: fc.constant(rows),
      order: fc.shuffledSubarray(inOrder(rows), { minLength: rows.length }),
      files: fc.array(fc.integer({ min: 0, max: 2 }), {
        minLength: rows.length,
        maxLength: rows.length,
      }),
    }),
  );
  fc.assert(
    fc.property(spread, kind, ({ rows, order, files }, k) => {
      const parts = [0, 1, 2].map((file) => order.filter((i) => files[i] === file));
      const split = parts.map((part) => asSource(toColumns(rows, part), k));
      const together = energy([asSource(toColumns(rows, inOrder(rows)), k)]);
      expect(sums(energy(split))).toEqual(sums(together));
      expect(sums(energy([...split].reverse()))).toEqual(sums(together));
    }),
    { numRuns: 80 },
  );
});

test("the same file twice counts once", () => {
  fc.assert(
    fc.property(rowsOf, kind, (rows, k) => {
      const columns = toColumns(rows, inOrder(rows));
      const once = energy([asSource(columns, k)]);
      expect(sums(energy([asSource(columns, k), asSource(columns, k, 1)]))).toEqual(sums(once));
    }),
    { numRuns: 30 },
  );
});

test("swapping supply and return, meter side included, swaps the registers", () => {
  fc.assert(
    fc.property(rowsOf, kind, (rows, k) => {
      const swapped = rows.map((r) => ({ ...r, supply: r.back, back: r.supply }));
      const own = energy([asSource(toColumns(rows, inOrder(rows)), k)]);
      const other = energy([asSource(toColumns(swapped, inOrder(rows)), k)], {
        meterSide: "return",
      });
      expect(other.heating.energyKwh).toBeCloseTo(own.cooling.energyKwh, 9);
      expect(other.cooling.energyKwh).toBeCloseTo(own.heating.energyKwh, 9);
      expect(other.suppressedKwh).toBeCloseTo(own.suppressedKwh, 9);
    }),
    { numRuns: 30 },
  );
});

test("both registers are never negative and nothing covers time twice", () => {
  fc.assert(
    fc.property(rowsOf, kind, (rows, k) => {
      const segments = resolveSegments([asSource(toColumns(rows, inOrder(rows)), k)]);
      const columns = integrateEnergy(segments, { ...options, cutOffs: NO_CUT_OFFS });
      expect(columns.heating.energyKwh.every((kwh) => kwh >= 0)).toBe(true);
      expect(columns.cooling.energyKwh.every((kwh) => kwh >= 0)).toBe(true);
      expect(columns.coveredS.every((s) => s <= 900.000001)).toBe(true);
    }),
    { numRuns: 30 },
  );
});

/** Rows of a permanent meter alone: a power that may be of either sign. */
function meterColumns(rows: readonly Row[], order: readonly number[]): ReadingColumns {
  const columns = toColumns(rows, order);
  const powerKw = Float64Array.from(order, (i) => 10 * (rows[i]!.supply - rows[i]!.back));
  return { ...columns, flowM3PerHour: null, supplyC: null, returnC: null, powerKw };
}

test("a meter's energy is additive over any split, adds no volume and covers what it speaks for", () => {
  fc.assert(
    fc.property(rowsOf, kind, fc.double({ min: 0, max: 1, noNaN: true }), (rows, k, share) => {
      const source = asSource(meterColumns(rows, inOrder(rows)), k);
      const end = source.columns.instantMs[rows.length - 1]!;
      const cutMs = Math.round(T0 + share * (end - T0));
      const before = energy([source], { window: { startMs: -Infinity, endMs: cutMs } });
      const after = energy([source], { window: { startMs: cutMs, endMs: Infinity } });
      const whole = energy([source]);
      expectClose(
        sums(before).map((value, i) => value + sums(after)[i]!),
        sums(whole),
      );
      expect(whole.volumeM3).toBe(0);
      expect(whole.meanSupplyC).toBeNull();
      expect(whole.meterOnlyS).toBeCloseTo(whole.coveredS, 9);
    }),
    { numRuns: 60 },
  );
});

test("a meter's power of the other sign swaps the registers, and in one service never counts", () => {
  fc.assert(
    fc.property(rowsOf, kind, (rows, k) => {
      const columns = meterColumns(rows, inOrder(rows));
      const turned = { ...columns, powerKw: columns.powerKw!.map((kw) => 0 - kw) };
      const own = energy([asSource(columns, k)]);
      const other = energy([asSource(turned, k)]);
      expect(other.heating.energyKwh).toBeCloseTo(own.cooling.energyKwh, 9);
      expect(other.cooling.energyKwh).toBeCloseTo(own.heating.energyKwh, 9);
      const single = energy([asSource(columns, k)], { service: "heating" });
      expect(single.cooling.energyKwh).toBe(0);
      expect(single.heating.energyKwh).toBeCloseTo(own.heating.energyKwh, 9);
      expect(single.coveredS).toBeCloseTo(own.coveredS, 9);
      const against = rows.filter((r) => r.quality === 0 && r.supply < r.back);
      expect(single.againstRows).toBe(against.length);
    }),
    { numRuns: 60 },
  );
});

test("energy is the same after every reading went through another unit and back", () => {
  fc.assert(
    fc.property(rowsOf, kind, (rows, k) => {
      const columns = toColumns(rows, inOrder(rows));
      const there = {
        ...columns,
        flowM3PerHour: columns.flowM3PerHour!.map((flow) =>
          toM3PerHour(fromM3PerHour(flow, "US gpm"), "US gpm"),
        ),
        supplyC: columns.supplyC!.map((t) => toCelsius(fromCelsius(t, "degF"), "degF")),
        returnC: columns.returnC!.map((t) => toCelsius(fromCelsius(t, "K"), "K")),
      };
      // A cut-off is a threshold: a last digit may cross it.
      const changed = { cutOffs: NO_CUT_OFFS };
      expectClose(
        sums(energy([asSource(there, k)], changed)),
        sums(energy([asSource(columns, k)], changed)),
      );
      const metered = meterColumns(rows, inOrder(rows));
      const tons = {
        ...metered,
        powerKw: metered.powerKw!.map((kw) => toKw(fromKw(kw, "ton"), "ton")),
      };
      expectClose(sums(energy([asSource(tons, k)])), sums(energy([asSource(metered, k)])));
    }),
    { numRuns: 60 },
  );
});

/** The rows as a volume counter and its temperatures would have written them. */
test("a counter's energy is that of its volume, whatever files its rows are spread over", () => {
  const spread = rowsOf.chain((rows) =>
    fc.record({
      rows: fc.constant(rows.map((r) => ({ ...r, quality: 0, stepMs: NOMINAL }))),
      files: fc.array(fc.integer({ min: 0, max: 2 }), {
        minLength: rows.length,
        maxLength: rows.length,
      }),
    }),
  );
  fc.assert(
    fc.property(spread, ({ rows, files }) => {
      let total = 0;
      const counter = rows.map((r) => (total += r.flow));
      const counted = (order: readonly number[]): ReadingColumns => ({
        ...toColumns(rows, order),
        flowM3PerHour: null,
        volumeCounterM3: Float64Array.from(order, (i) => counter[i]!),
      });
      const uncut = { cutOffs: NO_CUT_OFFS };
      const whole = energy([asSource(counted(inOrder(rows)), "instantaneous")], uncut);
      expect(whole.volumeM3).toBeCloseTo(total - counter[0]!, 6);
      const parts = [0, 1, 2].map((file) => inOrder(rows).filter((i) => files[i] === file));
      const split = parts.map((part) => asSource(counted(part), "instantaneous"));
      expectClose(sums(energy(split, uncut)), sums(whole));
    }),
    { numRuns: 60 },
  );
});
