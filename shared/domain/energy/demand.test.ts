import { intervalColumns } from "@test/reference/interval-columns";
import { peakDemand, type EnergySteps } from "./demand";

const T0 = Date.UTC(2026, 4, 14);
const quarter = 900_000;

function quarters(...powerKw: number[]): EnergySteps & { coveredS: Float64Array } {
  const { startMs, coveredS, cooling } = intervalColumns(T0, powerKw);
  return { stepMs: quarter, startMs, coveredS, energyKwh: cooling.energyKwh };
}

const fixed = (windowMinutes: number) => ({ kind: "fixed", windowMinutes }) as const;
const rolling = (windowMinutes: number) => ({ kind: "rolling", windowMinutes }) as const;

test("a fixed half hour stands on the clock, a rolling one on any quarter", () => {
  const steps = quarters(10, 40, 50, 10);
  expect(peakDemand(steps, fixed(30))).toEqual({
    startMs: T0 + 2 * quarter,
    endMs: T0 + 4 * quarter,
    powerKw: 30,
    definition: { kind: "fixed", windowMinutes: 30 },
  });
  expect(peakDemand(steps, rolling(30))).toMatchObject({ startMs: T0 + quarter, powerKw: 45 });
});

test("fixed blocks follow the wall clock where a zone is off the half hour", () => {
  const nepal = () => 5.75 * 3_600_000;
  expect(peakDemand(quarters(10, 40, 50, 10), fixed(30), nepal)?.powerKw).toBe(45);
});

test("a window with a hole in it, or across one, never qualifies", () => {
  const steps = quarters(10, 90, 50, 20);
  steps.coveredS[1] = 880;
  expect(peakDemand(steps, rolling(30))?.powerKw).toBe(35);
  steps.coveredS[2] = 0;
  expect(peakDemand(steps, rolling(30))).toBeNull();
  const split = quarters(10, 90, 50, 20);
  split.startMs[2]! += quarter;
  split.startMs[3]! += quarter;
  expect(peakDemand(split, rolling(30))?.powerKw).toBe(50);
});

test("of equal windows the first counts, also where sums round differently", () => {
  expect(peakDemand(quarters(30, 30, 30, 30), rolling(30))?.startMs).toBe(T0);
  const tenths = quarters(0.1, 0.2, 0.3, 0.6, 0.3, 0.2, 0.1);
  expect(peakDemand(tenths, rolling(45))?.startMs).toBe(T0 + 2 * quarter);
});

test("a pump that stood still has a peak of zero, and a step longer than the window has none", () => {
  expect(peakDemand(quarters(0, 0), fixed(15))?.powerKw).toBe(0);
  const hourly = { ...quarters(40, 60), stepMs: 4 * quarter };
  expect(peakDemand(hourly, fixed(15))).toBeNull();
  expect(peakDemand(quarters(40, 60), fixed(20))).toBeNull();
});
