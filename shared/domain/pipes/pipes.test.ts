import {
  boreMm,
  flowAtVelocityM3PerHour,
  outsideDiameterFromCircumferenceMm,
  velocityMPerS,
} from "./bore";
import { PIPE_TABLES, pipeSize, pipeTable } from "./pipe-tables";

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
