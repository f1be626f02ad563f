import {
  boreMm,
  flowAtVelocityM3PerHour,
  outsideDiameterFromCircumferenceMm,
  velocityMPerS,
} from "./bore";
import { boreUncertaintyMm } from "./bore-uncertainty";
import { PIPE_TABLES, pipeSize, pipeTable } from "./pipe-tables";
import { reynoldsNumber } from "./reynolds-number";
import { straightRunAfter, straightRunBefore } from "./straight-run";

test("every row's bore is its outside diameter less both walls and linings", () => {
  expect(PIPE_TABLES).toHaveLength(21);
  for (const { sizes } of PIPE_TABLES) {
    for (const size of sizes) {
      const bore = boreMm(size.outsideDiameterMm, size.wallMm, size.liningMm);
      expect(Math.abs(bore! - size.boreMm)).toBeLessThan(0.02);
    }
  }
});

test("a table or size that does not exist is unknown, not a guess", () => {
  expect(pipeTable("no-such-table")).toBeNull();
  expect(pipeSize("asme-b36.10m-40", 101)).toBeNull();
});

test("a taped circumference and the mean wall give the bore", () => {
  const outside = outsideDiameterFromCircumferenceMm(359.1);
  expect(boreMm(outside, (5.62 + 5.71 + 5.66 + 5.69) / 4)).toBeCloseTo(102.9651, 4);
});

test("a wall as thick as the pipe leaves no bore", () => {
  expect(boreMm(50, 25)).toBeNull();
  expect(boreMm(50, 20, 6)).toBeNull();
});

test("speed and flow are each other's inverse and keep the direction", () => {
  expect(velocityMPerS(flowAtVelocityM3PerHour(-1.2, 80), 80)).toBeCloseTo(-1.2, 12);
});

test("disturbed flow asks for twice the straight before the meter, and nothing blocks", () => {
  expect(straightRunBefore(1, 100, "bend")).toEqual({
    bores: 10,
    advisedBores: 10,
    verdict: "ok",
  });
  for (const fitting of ["twoBendsOutOfPlane", "throttledValve", "pump"] as const) {
    expect(straightRunBefore(1.9, 100, fitting)).toMatchObject({
      advisedBores: 20,
      verdict: "short",
    });
  }
  expect(straightRunBefore(0.99, 100, "pump")?.verdict).toBe("tooShort");
  expect(straightRunBefore(0.499, 100, "other")?.verdict).toBe("tooShort");
  expect(straightRunAfter(0.25, 100)?.verdict).toBe("short");
  expect(straightRunAfter(0.249, 100)?.verdict).toBe("tooShort");
  expect(straightRunAfter(NaN, 100)).toBeNull();
  expect(straightRunBefore(1, 0, "bend")).toBeNull();
});

test("one wall reading leaves the bore's uncertainty unknown", () => {
  expect(boreUncertaintyMm(0.2, 0.05, [5.6])).toBeNull();
  expect(boreUncertaintyMm(0.2, 0.05, [5.6, 5.6])).toBeCloseTo(Math.sqrt(0.04 + 4 * 0.0025), 12);
});

test("Reynolds number keeps its size when the flow turns round", () => {
  const flow = { velocityMPerS: 1, boreMm: 100, densityKgPerM3: 1000, viscosityPaS: 0.001 };
  expect(reynoldsNumber(flow)).toBeCloseTo(100_000, 6);
  expect(reynoldsNumber({ ...flow, velocityMPerS: -1 })).toBe(reynoldsNumber(flow));
});
