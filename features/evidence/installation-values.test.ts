import { bodyOf, installationValues, instantOf, readWalls } from "./installation-values";

const zone = "Europe/Paris";
const empty = installationValues(null, zone);

it("wall readings stand apart by blanks or semicolons, with point or comma", () => {
  expect(readWalls("5.62 5.71  5,66;5.69")).toEqual([5.62, 5.71, 5.66, 5.69]);
  expect(readWalls("5.62 x")).toBeNull();
  expect(readWalls("0.2")).toBeNull();
});

it("a local time becomes an instant, and none where there is no such time", () => {
  expect(instantOf("2026-02-20", "09:30", zone)).toBe("2026-02-20T08:30:00.000Z");
  expect(instantOf("2026-07-20", "", zone)).toBe("2026-07-19T22:00:00.000Z");
  expect(instantOf("2026-03-29", "02:30", zone)).toBeNull();
  expect(instantOf("2026-02-20", "25:00", zone)).toBeNull();
});

it("sends nothing without a start, and leaves what is half typed unknown", () => {
  expect(bodyOf(empty, zone)).toBeNull();
  const begun = { ...empty, startDate: "2026-02-20", upstreamM: 0.92, circumferenceMm: 359.1 };
  expect(bodyOf(begun, zone)).toMatchObject({ straightRun: null, pipe: null, zero: null });
  const whole = {
    ...begun,
    walls: "5.62 5.71 5.66 5.69",
    downstreamM: 0.61,
    nearestFitting: "bend" as const,
  };
  expect(bodyOf(whole, zone)).toMatchObject({
    straightRun: { upstreamM: 0.92, downstreamM: 0.61, nearestFitting: "bend" },
    pipe: { circumferenceMm: 359.1, wallReadingsMm: [5.62, 5.71, 5.66, 5.69], liningMm: 0 },
  });
});
