import type { QualityRun } from "@shared/domain/readings/quality-runs";
import { withFills } from "./filled-runs";

const run = (
  startMs: number,
  endMs: number,
  kind: QualityRun["kind"],
  rows: number,
): QualityRun => ({
  startMs,
  endMs,
  kind,
  rows,
  reason: kind === "measured" ? null : "noRows",
});

test("what is filled of a gap is a run of its own, and measured time stays measured", () => {
  const runs = [run(0, 10, "measured", 0), run(10, 50, "missing", 40), run(50, 60, "measured", 0)];
  const shown = withFills(runs, [
    { startMs: 5, endMs: 20 },
    { startMs: 30, endMs: 55 },
  ]);
  expect(shown.map(({ kind, startMs, endMs, rows }) => [kind, startMs, endMs, rows])).toEqual([
    ["measured", 0, 10, 0],
    ["filled", 10, 20, 10],
    ["missing", 20, 30, 10],
    ["filled", 30, 50, 20],
    ["measured", 50, 60, 0],
  ]);
});
