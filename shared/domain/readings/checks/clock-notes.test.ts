import { shortSeries } from "@test/generators/clean-series";
import { DAY_MS, MINUTE_MS } from "../../time/interval";
import { trueInstantMs } from "../corrections/clock";
import { clockFromNotes, clockOff } from "./clock-notes";

const START_MS = Date.UTC(2025, 2, 3, 12);
const start = { loggerMs: START_MS, referenceMs: START_MS + 90_000 };
const end = { loggerMs: START_MS + 4 * DAY_MS, referenceMs: START_MS + 4 * DAY_MS + 98_000 };

it("takes offset and drift from the notes of start and end", () => {
  const error = clockFromNotes([end, start])!;
  expect(error).toEqual({
    offsetMs: 90_000,
    driftPerMs: 8_000 / (4 * DAY_MS),
    referenceMs: START_MS,
  });
  for (const note of [start, end])
    expect(trueInstantMs(note.loggerMs, error)).toBe(note.referenceMs);
  expect(trueInstantMs(START_MS + DAY_MS, error)).toBe(START_MS + DAY_MS + 92_000);
});

it("makes no drift of a single note, and nothing of notes that contradict time", () => {
  expect(clockFromNotes([start])).toEqual({
    offsetMs: 90_000,
    driftPerMs: 0,
    referenceMs: START_MS,
  });
  expect(clockFromNotes([])).toBeNull();
  expect(clockFromNotes([start, { ...start, referenceMs: START_MS }])).toBeNull();
  expect(clockFromNotes([start, { loggerMs: START_MS + 1000, referenceMs: START_MS }])).toBeNull();
});

it("finds a clock that is off by more than 30 s or half a step", () => {
  const series = shortSeries({ flow: [31, 31, 31] });
  const by = (ms: number, stepMs = 15 * MINUTE_MS) =>
    clockOff({ ...series, nominalStepMs: stepMs }, [
      { loggerMs: START_MS, referenceMs: START_MS + ms },
    ]);
  expect(by(30_000)).toBeNull();
  expect(by(31_000)).toMatchObject({
    weight: "note",
    figures: { offsetS: 31, driftSPerDay: null },
  });
  expect(by(-450_000)).toMatchObject({ weight: "look", figures: { atLastRowS: -450 } });
  expect(by(6_000, 10_000)).toMatchObject({ weight: "look" });
  expect(clockOff(series, [])).toBeNull();
});

it("looks at both ends of the rows, and offers the very correction", () => {
  const series = shortSeries({ flow: [31, 31] }, DAY_MS, [START_MS, START_MS + 10 * DAY_MS]);
  const finding = clockOff(series, [
    { loggerMs: START_MS, referenceMs: START_MS },
    { loggerMs: START_MS + DAY_MS, referenceMs: START_MS + DAY_MS + 4000 },
  ])!;
  expect(finding.figures).toMatchObject({ offsetS: 0, driftSPerDay: 4, atFirstRowS: 0 });
  expect(finding.figures.atLastRowS).toBeCloseTo(40, 9);
  expect(finding.choices[0]).toEqual({
    change: "clock",
    error: { offsetMs: 0, driftPerMs: 4000 / DAY_MS, referenceMs: START_MS },
  });
});
