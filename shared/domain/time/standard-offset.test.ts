import { standardOffsetMs } from "./standard-offset";

const HOUR_MS = 3_600_000;

describe("a zone's time without summer time", () => {
  it.each([
    ["Europe/Paris", 1],
    ["America/New_York", -5],
    // Summer there is winter here.
    ["Australia/Sydney", 10],
    ["Australia/Lord_Howe", 10.5],
    ["Asia/Tokyo", 9],
    ["Asia/Kolkata", 5.5],
  ])("is the same in every month in %s", (zone, hours) => {
    for (let month = 0; month < 12; month++)
      expect(standardOffsetMs(zone, Date.UTC(2025, month, 15)) / HOUR_MS).toBe(hours);
  });
});
