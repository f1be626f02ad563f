import { companionColumns, companionSeries } from "./companion-series";
import type { ReadingColumns } from "./reading-columns";
import { resolveSegments, type ReadingSource } from "./resolve-segments";

const MINUTE = 60_000;
const start = Date.UTC(2025, 6, 14);

function source(
  precedence: number,
  minutes: readonly number[],
  channels: Partial<Record<"outdoorC" | "flowM3PerHour", readonly number[]>>,
): ReadingSource {
  const column = (values: readonly number[] | undefined) =>
    values ? Float64Array.from(values) : null;
  const columns: ReadingColumns = {
    instantMs: Float64Array.from(minutes, (minute) => start + minute * MINUTE),
    flowM3PerHour: column(channels.flowM3PerHour),
    supplyC: null,
    returnC: null,
    signalPercent: null,
    ...(channels.outdoorC && { outdoorC: column(channels.outdoorC) }),
    quality: new Uint8Array(minutes.length),
  };
  return { precedence, kind: "instantaneous", nominalStepMs: 5 * MINUTE, columns };
}

describe("a companion series", () => {
  const first = source(1, [0, 5, 10], { outdoorC: [14, 15, 16] });
  const later = source(2, [10, 15], { outdoorC: [17, 18], flowM3PerHour: [20, 21] });

  test("comes from every file that holds it, the later one winning", () => {
    const series = companionSeries([first, later], "outdoorC");
    expect([...series!.values]).toEqual([14, 15, 17, 18]);
    expect(companionSeries([first, later], "pressureKpa")).toBeNull();
  });

  test("gives no segment by itself and changes none beside it", () => {
    expect(resolveSegments([first])).toEqual([]);
    const [segment, ...others] = resolveSegments([first, later]);
    expect(others).toEqual([]);
    expect([...segment!.columns.instantMs]).toEqual([start + 10 * MINUTE, start + 15 * MINUTE]);
    expect([...segment!.columns.flowM3PerHour!]).toEqual([20, 21]);
  });

  test("is drawn row by row where rows are few, the pen lifted over a gap", () => {
    const gap = source(1, [0, 5, 60], { outdoorC: [14, 15, 16] });
    const window = { startMs: start, endMs: start + 61 * MINUTE };
    const drawn = companionColumns(companionSeries([gap], "outdoorC")!, window, 10);
    expect([...drawn.values]).toEqual([14, 15, NaN, 16]);
    expect(drawn).toMatchObject({ columnMs: null, rows: 3 });
  });

  test("is drawn as means of one round length where rows are many", () => {
    const day = Array.from({ length: 288 }, (_, i) => 5 * i);
    const long = source(1, day, { outdoorC: day.map((minute) => Math.floor(minute / 60)) });
    const window = { startMs: start, endMs: start + 24 * 60 * MINUTE };
    const drawn = companionColumns(companionSeries([long], "outdoorC")!, window, 24);
    expect(drawn.columnMs).toBe(60 * MINUTE);
    expect([...drawn.values]).toEqual(Array.from({ length: 24 }, (_, hour) => hour));
  });
});
