import { peakDemand } from "@shared/domain/energy/demand";
import { INTERVAL_MS } from "@shared/domain/energy/interval-energy";
import { sumIntervals, totalEnergy } from "@shared/domain/energy/totals";
import { localDay, localHoursBetween } from "@shared/domain/time/local-calendar";
import { createLocalClock } from "@shared/domain/time/local-clock";
import { intervalColumns } from "./interval-columns";
import { readCsv, readJson, relativeError } from "./read-csv";

// Recomputed from the readings alone by a second program; 0.01 %.
const expected = readJson("test/fixtures/scenarios/S06/expected.json") as Record<
  "autumn_2025_10_26" | "spring_2026_03_29",
  Record<string, number | string>
>;
const zone = "Europe/Paris";

describe.each([
  ["autumn", "2025-10-26", expected.autumn_2025_10_26, 100],
  ["spring", "2026-03-29", expected.spring_2026_03_29, 92],
] as const)("the %s day of local labels without an offset", (name, date, day, intervals) => {
  const rows = readCsv(`test/fixtures/scenarios/S06/${name}.csv`, ";");
  const clock = createLocalClock(zone);
  const instants = rows.map((row) => {
    const [dayPart = "", time = ""] = (row["local_time"] ?? "").split(" ");
    return clock.toUtc(Date.parse(`${dayPart.split("/").reverse().join("-")}T${time}:00Z`));
  });
  const powerKw = rows.map((row) => Number((row["mean_kW"] ?? "").replace(",", ".")));
  const range = localDay(date, zone);
  const columns = intervalColumns(range.startMs, powerKw);

  test("is read as one unbroken run of quarter hours", () => {
    expect(instants).toHaveLength(intervals);
    expect(instants).toEqual(Array.from(columns.startMs));
    expect(range.endMs).toBe(instants[intervals - 1]! + 900_000);
  });

  test("gives the day's energy and its peaks, fixed and rolling", () => {
    expect(totalEnergy(columns, range).cooling.energyKwh).toBeCloseTo(Number(day.energy_kWh), 3);
    const { startMs, coveredS, cooling } = columns;
    const steps = { stepMs: INTERVAL_MS, startMs, coveredS, energyKwh: cooling.energyKwh };
    const peak = (windowMinutes: number, kind: "fixed" | "rolling") =>
      peakDemand(steps, { kind, windowMinutes });
    for (const [own, key] of [
      [peak(15, "fixed"), "peak15_kW"],
      [peak(30, "fixed"), "peak30_fixed_kW"],
      [peak(60, "fixed"), "peak60_fixed_kW"],
      [peak(60, "rolling"), "peak60_rolling_kW"],
    ] as const) {
      expect(relativeError(own?.powerKw ?? NaN, Number(day[key]))).toBeLessThan(1e-4);
    }
    expect(peak(60, "fixed")?.startMs).toBe(Date.parse(String(day.peak60_fixed_start_utc)));
    expect(peak(60, "rolling")?.startMs).toBe(Date.parse(String(day.peak60_rolling_start_utc)));
  });

  test("has as many hours as the clock showed, and they add up", () => {
    const hours = sumIntervals(columns, localHoursBetween(range, zone));
    expect(hours).toHaveLength(intervals / 4);
    const sum = hours.reduce((kwh, hour) => kwh + hour.cooling.energyKwh, 0);
    expect(sum).toBeCloseTo(Number(day.energy_kWh), 3);
  });
});
