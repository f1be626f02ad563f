import { totalEnergy, type EnergyTotals } from "@shared/domain/energy/totals";
import { NO_CUT_OFFS } from "@shared/domain/energy/power";
import { absolutePressureMPa, fluidForEnergy } from "@shared/domain/fluids/loop-fluid";
import type { ReadingSegment, SeriesKind } from "@shared/domain/readings/reading-columns";
import type { Interval } from "@shared/domain/time/interval";
import { localDaysBetween } from "@shared/domain/time/local-calendar";
import { Random } from "@test/generators/random";
import { calculateEnergy, calculateSpan } from "./calculate-energy";
import type { EnergySettings } from "./energy-settings";

const settings: EnergySettings = {
  organisationId: "1",
  pointId: "1",
  zone: "Europe/London",
  service: "chilled",
  meterSide: "return",
  cutOffs: NO_CUT_OFFS,
  pressure: absolutePressureMPa(0.4),
  loopFluid: { kind: "water" },
  fluid: fluidForEnergy({ kind: "water" }, 0.4),
  meterPlace: {
    service: "chilled",
    designFlowM3PerHour: null,
    designDeltaTK: null,
    insideDiameterMm: null,
    gapRule: "survey",
  },
};

/** Rows of a varying load over both clock changes of London, with holes, frost and a steam leak. */
function segmentOf(kind: SeriesKind, stepMs: number, count: number): ReadingSegment {
  const random = new Random(11);
  const startMs = Date.UTC(2025, 2, 1, 10, 7);
  const column = (value: (row: number) => number) =>
    Float64Array.from({ length: count }, (_, i) => value(i));
  const instantMs = column((i) => startMs + i * stepMs);
  const columns = {
    instantMs,
    flowM3PerHour: column((i) =>
      i % 501 === 0 ? NaN : 28 + 8 * Math.sin(i / 230) + random.next(),
    ),
    supplyC: column((i) => (i % 7001 === 0 ? 170 : 6.4 + random.next() / 3)),
    returnC: column((i) => 12.2 + Math.sin(i / 230)),
    signalPercent: null,
    quality: Uint8Array.from({ length: count }, (_, i) => (i % 501 === 0 ? 2 : 0)),
  };
  return { kind, nominalStepMs: stepMs, columns };
}

function expectSame(a: EnergyTotals, b: EnergyTotals): void {
  const flat = (totals: EnergyTotals) =>
    Object.entries({ ...totals, ...totals.heating, ...totals.cooling }).filter(
      ([, value]) => typeof value !== "object",
    );
  for (const [i, [name, value]] of flat(a).entries()) {
    const [, other] = flat(b)[i] as [string, number];
    if (typeof value !== "number") expect([name, other]).toEqual([name, value]);
    else expect(Math.abs(other - value)).toBeLessThanOrEqual(1e-11 * Math.abs(value));
  }
}

test.each(["instantaneous", "meanFromLabel", "meanToLabel"] as const)(
  "energy of a span worked out stretch by stretch is that of the whole (%s)",
  (kind) => {
    const segment = segmentOf(kind, 120_000, 170_000);
    const { instantMs } = segment.columns;
    const span: Interval = {
      startMs: instantMs[0] as number,
      endMs: (instantMs[instantMs.length - 1] as number) + 1,
    };
    const days = localDaysBetween(span, settings.zone);
    const whole = calculateEnergy([segment], settings, days, span);
    const shares: number[] = [];
    const parts = calculateSpan([segment], settings, days, span, (share) => shares.push(share));
    if (whole === null || parts === null) throw new Error("no energy");
    expect(days.length).toBe(237);
    expect(shares).toEqual([92 / 237, 184 / 237, 1]);
    const totals = totalEnergy(whole.intervals);
    expect(totals.cooling.energyKwh).toBeGreaterThan(100_000);
    expect(totals.measuredRows + totals.noReadingRows).toBe(170_000);
    expectSame(totals, parts.totals);
    expect(parts.days).toEqual(whole.days);
    expect(parts.outsideFluidRows).toBe(whole.outsideFluidRows);
    expect(parts.outsideFluidRows).toBe(24);
    expect(parts.outsideFluid).toEqual(whole.outsideFluid);
  },
);

test("work on a span stops where its progress throws", () => {
  const segment = segmentOf("instantaneous", 120_000, 170_000);
  const { instantMs } = segment.columns;
  const span = { startMs: instantMs[0] as number, endMs: instantMs.at(-1) as number };
  const stop = () => {
    throw new Error("cancelled");
  };
  expect(() =>
    calculateSpan([segment], settings, localDaysBetween(span, settings.zone), span, stop),
  ).toThrow("cancelled");
});
