import { DateTime } from "luxon";
import { durationMs, HOUR_MS } from "./interval";
import {
  addDays,
  isLocalDate,
  isoWeekOf,
  localDateOf,
  localDay,
  localDaysBetween,
  localHoursBetween,
  monthRange,
  rangeOfDates,
  weekdayOf,
  weekRange,
} from "./local-calendar";

test("days are as long as the zone makes them", () => {
  // IANA tz database.
  for (const [date, zone, hours] of [
    ["2025-10-26", "Europe/Paris", 25],
    ["2026-03-29", "Europe/Paris", 23],
    ["2025-11-02", "America/New_York", 25],
    ["2026-04-05", "Australia/Lord_Howe", 24.5],
    ["2026-04-05", "Asia/Tokyo", 24],
  ] as const) {
    expect(durationMs(localDay(date, zone)) / HOUR_MS).toBe(hours);
  }
  expect(durationMs(monthRange(2025, 10, "Europe/Paris")) / HOUR_MS).toBe(745);
  expect(durationMs(monthRange(2026, 3, "Europe/Paris")) / HOUR_MS).toBe(743);
});

test("a day whose midnight is skipped starts when the clock starts it", () => {
  // IANA tz database: Santiago put clocks forward at midnight on 7 September 2025.
  const day = localDay("2025-09-07", "America/Santiago");
  expect(durationMs(day)).toBe(23 * HOUR_MS);
  expect(localDateOf(day.startMs, "America/Santiago")).toBe("2025-09-07");
  expect(localDateOf(day.startMs - 1, "America/Santiago")).toBe("2025-09-06");
});

test("weeks and weekdays are those of ISO 8601 round every New Year", () => {
  const wrong: string[] = [];
  for (let year = 1999; year < 2031; year++) {
    for (let days = 0; days < 24; days++) {
      const date = addDays(`${year}-12-20`, days);
      const { weekYear, weekNumber, weekday } = DateTime.fromISO(date, { zone: "UTC" });
      const { isoYear, week } = isoWeekOf(date);
      const same = isoYear === weekYear && week === weekNumber && weekdayOf(date) === weekday;
      if (!same) wrong.push(date);
    }
  }
  expect(wrong).toEqual([]);
  const week = weekRange({ isoYear: 2025, week: 43 }, "Europe/Paris");
  expect(localDateOf(week.startMs, "Europe/Paris")).toBe("2025-10-20");
  expect(durationMs(week) / HOUR_MS).toBe(169);
});

test("local days cover an interval whole, once each and in order", () => {
  const zone = "Europe/Paris";
  const days = localDaysBetween(rangeOfDates("2025-10-25", "2025-10-28", zone), zone);
  expect(days.map((day) => day.date)).toEqual(["2025-10-25", "2025-10-26", "2025-10-27"]);
  const part = localDaysBetween({ startMs: days[1]!.startMs + 1, endMs: days[1]!.endMs }, zone);
  expect(part).toEqual([days[1]]);
  expect(localDaysBetween({ startMs: 5, endMs: 5 }, zone)).toEqual([]);
  const apia = rangeOfDates("2011-12-29", "2012-01-01", "Pacific/Apia");
  expect(localDaysBetween(apia, "Pacific/Apia").map((day) => day.date)).toEqual([
    "2011-12-29",
    "2011-12-31",
  ]);
});

test("local hours follow the wall clock, half-hour zones included", () => {
  const paris = localHoursBetween(localDay("2025-10-26", "Europe/Paris"), "Europe/Paris");
  expect(paris).toHaveLength(25);
  expect(localHoursBetween(localDay("2026-03-29", "Europe/Paris"), "Europe/Paris")).toHaveLength(
    23,
  );
  const india = localHoursBetween(localDay("2025-01-01", "Asia/Kolkata"), "Asia/Kolkata");
  expect(india).toHaveLength(24);
  expect(india[0]!.startMs).toBe(Date.UTC(2024, 11, 31, 18, 30));
  const howe = localHoursBetween(
    localDay("2026-04-05", "Australia/Lord_Howe"),
    "Australia/Lord_Howe",
  );
  expect(howe.reduce((sum, hour) => sum + durationMs(hour), 0)).toBe(24.5 * HOUR_MS);
});

test("only real days are dates", () => {
  expect(isLocalDate("2024-02-29")).toBe(true);
  expect(["2025-02-29", "2025-13-01", "2025-1-1", "20250101"].some(isLocalDate)).toBe(false);
  expect(() => addDays("2025-02-30", 1)).toThrow("2025-02-30");
});
