import { DateTime } from "luxon";
import { isKnownZone, zoneOffsets } from "./zone-offsets";

const ZONES = [
  "Europe/Paris",
  "America/New_York",
  "Australia/Lord_Howe",
  "Africa/Casablanca",
  "Asia/Kathmandu",
  "Pacific/Apia",
  "America/Sao_Paulo",
  "Asia/Tokyo",
  "UTC",
];

test("offsets equal those of a date library every 97 hours of twenty years", () => {
  for (const zone of ZONES) {
    const offsets = zoneOffsets(zone);
    const differing: number[] = [];
    for (let ms = Date.UTC(2010, 0, 1); ms < Date.UTC(2030, 0, 1); ms += 97 * 3_600_000) {
      if (offsets.offsetAt(ms) !== DateTime.fromMillis(ms, { zone }).offset * 60_000) {
        differing.push(ms);
      }
    }
    expect(differing).toEqual([]);
  }
});

test("the change of clocks is found to the millisecond", () => {
  const paris = zoneOffsets("Europe/Paris");
  const change = Date.UTC(2025, 9, 26, 1);
  expect(paris.offsetAt(change - 1)).toBe(7_200_000);
  expect(paris.offsetAt(change)).toBe(3_600_000);
});

test("a local time is unique, shown twice or never shown", () => {
  const paris = zoneOffsets("Europe/Paris");
  expect(paris.fromLocal(Date.UTC(2025, 5, 1, 12))).toEqual({
    kind: "unique",
    utcMs: Date.UTC(2025, 5, 1, 10),
  });
  expect(paris.fromLocal(Date.UTC(2025, 9, 26, 2, 30))).toEqual({
    kind: "repeated",
    earlierMs: Date.UTC(2025, 9, 26, 0, 30),
    laterMs: Date.UTC(2025, 9, 26, 1, 30),
  });
  expect(paris.fromLocal(Date.UTC(2026, 2, 29, 2, 30))).toEqual({
    kind: "missing",
    changeMs: Date.UTC(2026, 2, 29, 1),
    asBeforeChangeMs: Date.UTC(2026, 2, 29, 1, 30),
  });
  expect(paris.fromLocal(Date.UTC(2025, 9, 26, 3)).kind).toBe("unique");
  expect(paris.fromLocal(Date.UTC(2025, 9, 26, 2)).kind).toBe("repeated");
  expect(paris.fromLocal(Date.UTC(2026, 2, 29, 3)).kind).toBe("unique");
});

test("half-hour changes and a date that a zone skipped are read as the zone has them", () => {
  // IANA tz database: Lord Howe puts clocks back by 30 minutes; Samoa had no 30 December 2011.
  expect(zoneOffsets("Australia/Lord_Howe").fromLocal(Date.UTC(2026, 3, 5, 1, 45)).kind).toBe(
    "repeated",
  );
  expect(zoneOffsets("Australia/Lord_Howe").fromLocal(Date.UTC(2026, 3, 5, 1, 15)).kind).toBe(
    "unique",
  );
  expect(zoneOffsets("Pacific/Apia").fromLocal(Date.UTC(2011, 11, 30, 12)).kind).toBe("missing");
});

test("an invented zone is unknown", () => {
  expect(isKnownZone("Europe/Ostrel")).toBe(false);
  expect(isKnownZone("Europe/Berlin")).toBe(true);
  expect(isKnownZone("")).toBe(false);
});
