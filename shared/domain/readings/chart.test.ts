import { HOUR_MS, MINUTE_MS } from "../time/interval";
import { ChartBuilder, chartColumns, columnLengthMs } from "./chart-columns";
import { qualityRuns } from "./quality-runs";
import { RowQuality, type ReadingSegment, type SeriesKind } from "./reading-columns";

// Expected counts and means are worked out by hand from the rows written here.
const midnight = Date.UTC(2026, 4, 11);

interface Row {
  minute: number;
  flow?: number;
  supply?: number;
  ret?: number;
  quality?: number;
}

function segmentOf(rows: readonly Row[], kind: SeriesKind = "instantaneous"): ReadingSegment {
  const column = (read: (row: Row) => number) => Float64Array.from(rows.map(read));
  return {
    kind,
    nominalStepMs: MINUTE_MS,
    columns: {
      instantMs: column((row) => midnight + row.minute * MINUTE_MS),
      flowM3PerHour: column((row) => row.flow ?? 10),
      supplyC: column((row) => row.supply ?? 6),
      returnC: column((row) => row.ret ?? 12),
      signalPercent: null,
      quality: Uint8Array.from(rows.map((row) => row.quality ?? RowQuality.measured)),
    },
  };
}

const minutes = (from: number, to: number, row: Partial<Row> = {}): Row[] =>
  Array.from({ length: to - from }, (_, index) => ({ ...row, minute: from + index }));
const window = (hours: number) => ({ startMs: midnight, endMs: midnight + hours * HOUR_MS });

describe("chartColumns", () => {
  it("makes half hours of a week of one-minute rows on 352 columns", () => {
    expect(columnLengthMs(window(168), 352)).toBe(30 * MINUTE_MS);
  });

  it.each([
    ["means", 6],
    ["rows", 500],
  ])("makes the same columns of %s whether readings come at once or in parts", (_kind, most) => {
    // Parts end within a column, one is empty, and the rows outgrow the columns in the second.
    const rows = minutes(0, 300).map((row) => ({ ...row, flow: row.minute % 7, ret: row.minute }));
    const chosen = { ...window(6), most, anchorMs: midnight };
    const chart = new ChartBuilder(chosen);
    for (const [from, to] of [
      [0, 5] as const,
      [5, 95] as const,
      [95, 95] as const,
      [95, 300] as const,
    ])
      chart.add([segmentOf(rows.slice(from, to))]);
    expect(chart.isOfRows).toBe(most === 500);
    expect(chart.columns()).toEqual(chartColumns([segmentOf(rows)], chosen));
  });

  it("draws the mean of a column's measured rows and keeps its peak in the envelope", () => {
    const rows = minutes(0, 120).map((row) => (row.minute === 61 ? { ...row, ret: 42 } : row));
    const columns = chartColumns([segmentOf(rows)], {
      ...window(2),
      most: 2,
      anchorMs: midnight,
    });
    expect(columns.columnMs).toBe(HOUR_MS);
    expect(Array.from(columns.returnC)).toEqual([12, 12.5]);
    expect(Array.from(columns.envelope?.returnGreatestC ?? [])).toEqual([12, 42]);
    expect(Array.from(columns.envelope?.returnLeastC ?? [])).toEqual([12, 12]);
    expect(columns.rows).toBe(120);
  });

  it("leaves excluded rows out of the mean, and a column of only those empty", () => {
    const rows = [
      ...minutes(0, 60, { flow: 4 }),
      ...minutes(60, 120, { flow: 99, quality: RowQuality.excluded }),
    ];
    const columns = chartColumns([segmentOf(rows)], { ...window(2), most: 2, anchorMs: midnight });
    expect(Array.from(columns.flowM3PerHour)).toEqual([4, NaN]);
  });

  it("sends few rows as they are and lifts the pen over a gap", () => {
    const rows = [...minutes(0, 2), ...minutes(30, 31)];
    const columns = chartColumns([segmentOf(rows)], { ...window(1), most: 60, anchorMs: midnight });
    expect(columns.columnMs).toBeNull();
    expect(Array.from(columns.startMs, (at) => (at - midnight) / MINUTE_MS)).toEqual([0, 1, 2, 30]);
    expect(Array.from(columns.supplyC)).toEqual([6, 6, NaN, 6]);
  });

  it("starts columns at the anchor, so a day's columns are whole however the window is cut", () => {
    const columns = chartColumns([segmentOf(minutes(0, 240))], {
      startMs: midnight + 90 * MINUTE_MS,
      endMs: midnight + 240 * MINUTE_MS,
      most: 3,
      anchorMs: midnight,
    });
    expect((columns.startMs[0] ?? NaN) - midnight).toBe(HOUR_MS);
  });
});

describe("qualityRuns", () => {
  it("names a gap, a weak signal and a channel without a reading, with their rows", () => {
    const rows = [
      ...minutes(0, 10),
      ...minutes(20, 30),
      ...minutes(30, 35, { quality: RowQuality.excluded }),
      ...minutes(35, 45),
      ...minutes(45, 48, { quality: RowQuality.noReading }),
      ...minutes(48, 61),
    ];
    const runs = qualityRuns([segmentOf(rows)], window(1));
    expect(runs.map((run) => [run.kind, run.reason, run.rows])).toEqual([
      ["measured", null, 0],
      ["missing", "noRows", 10],
      ["measured", null, 0],
      ["excluded", "weakSignal", 5],
      ["measured", null, 0],
      ["missing", "noReading", 3],
      ["measured", null, 0],
    ]);
    expect(runs[1]).toMatchObject({
      startMs: midnight + 9 * MINUTE_MS,
      endMs: midnight + 20 * MINUTE_MS,
    });
  });

  it.each([
    ["meanFromLabel", 10],
    ["meanToLabel", 10],
  ] as const)("counts the rows a gap of %s labels swallowed", (kind, missing) => {
    const rows = [...minutes(1, 11), ...minutes(21, 61)];
    const runs = qualityRuns([segmentOf(rows, kind)], window(1));
    const gap = runs.filter((run) => run.kind === "missing" && run.startMs > midnight + MINUTE_MS);
    expect(gap.map((run) => run.rows)).toEqual([missing]);
  });

  it("is missing before the first and after the last row, and where there is no row at all", () => {
    const runs = qualityRuns([segmentOf(minutes(20, 41))], window(1));
    expect(runs.map((run) => [run.kind, (run.endMs - run.startMs) / MINUTE_MS])).toEqual([
      ["missing", 20],
      ["measured", 20],
      ["missing", 20],
    ]);
    expect(qualityRuns([], window(1))).toHaveLength(1);
  });

  it("says so where flow has no temperature beside it", () => {
    const rows = [...minutes(0, 30), ...minutes(30, 61, { supply: NaN })];
    const last = qualityRuns([segmentOf(rows)], window(1)).at(-1);
    expect(last).toMatchObject({ kind: "missing", reason: "noTemperature", rows: 30 });
  });
});
