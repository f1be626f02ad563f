import { RowQuality, type ReadingColumns, type SeriesKind } from "./reading-columns";
import { resolveSegments, type ReadingSource } from "./resolve-segments";

const T0 = Date.UTC(2026, 4, 14);
const minute = 60_000;

/** `[minute, flow, supply, return]` rows; a null channel is not in the file. */
function source(
  rows: readonly (readonly (number | null)[])[],
  precedence = 0,
  kind: SeriesKind = "instantaneous",
): ReadingSource {
  const column = (index: number) =>
    rows[0]?.[index] === null ? null : Float64Array.from(rows, (row) => row[index]!);
  const columns: ReadingColumns = {
    instantMs: Float64Array.from(rows, (row) => T0 + row[0]! * minute),
    flowM3PerHour: column(1),
    supplyC: column(2),
    returnC: column(3),
    signalPercent: null,
    quality: new Uint8Array(rows.length),
  };
  return { precedence, kind, nominalStepMs: null, columns };
}

const flowAt = (sources: readonly ReadingSource[]) =>
  resolveSegments(sources).flatMap(({ columns }) =>
    Array.from(columns.instantMs, (ms, i) => [(ms - T0) / minute, columns.flowM3PerHour![i]!]),
  );

test("two downloads that follow one another become one series", () => {
  const segments = resolveSegments([
    source([
      [3, 13, 6, 12],
      [4, 14, 6, 12],
      [5, 15, 6, 12],
    ]),
    source([
      [0, 10, 6, 12],
      [1, 11, 6, 12],
      [2, 12, 6, 12],
    ]),
  ]);
  expect(segments).toHaveLength(1);
  expect([...segments[0]!.columns.flowM3PerHour!]).toEqual([10, 11, 12, 13, 14, 15]);
  expect(segments[0]!.nominalStepMs).toBe(minute);
});

test("at equal instants the greater precedence wins and the rest completes it", () => {
  const earlier = source(
    [
      [0, 1, 6, 12],
      [1, 1, 6, 12],
      [2, 1, 6, 12],
      [3, 1, 6, 12],
    ],
    1,
  );
  const later = source(
    [
      [2, 2, 6, 12],
      [3, 2, 6, 12],
      [5, 2, 6, 12],
      [6, 2, 6, 12],
    ],
    2,
  );
  expect(flowAt([earlier, later])).toEqual([
    [0, 1],
    [1, 1],
    [2, 2],
    [3, 2],
    [5, 2],
    [6, 2],
  ]);
});

test("a row somebody excluded does not come back from an older file", () => {
  const newer = source(
    [
      [0, 2, 6, 12],
      [1, 2, 6, 12],
      [2, 2, 6, 12],
    ],
    2,
  );
  newer.columns.quality[1] = RowQuality.excluded;
  const older = source(
    [
      [0, 1, 6, 12],
      [1, 1, 6, 12],
      [2, 1, 6, 12],
    ],
    1,
  );
  const [segment] = resolveSegments([older, newer]);
  expect([...segment!.columns.quality]).toEqual([0, RowQuality.excluded, 0]);
});

test("a file of another step only fills what the better file leaves open", () => {
  const quarter = source(
    [
      [0, 9, 6, 12],
      [15, 9, 6, 12],
      [30, 9, 6, 12],
      [45, 9, 6, 12],
    ],
    1,
  );
  const minutes = source(
    [
      [13, 1, 6, 12],
      [14, 1, 6, 12],
      [15, 1, 6, 12],
      [16, 1, 6, 12],
    ],
    2,
  );
  expect(flowAt([quarter, minutes]).map(([, flow]) => flow)).toEqual([9, 1, 1, 1, 1, 9, 9]);
  const segments = resolveSegments([quarter, minutes]);
  expect(segments.map((segment) => segment.nominalStepMs / minute)).toEqual([15, 1, 15]);
});

test("temperatures from another file are brought to the flow's instants", () => {
  const flow = source([
    [0, 10, null, null],
    [1, 10, null, null],
    [2, 10, null, null],
    [9, 10, null, null],
  ]);
  const temperatures = source([
    [0, null, 6, 12],
    [5, null, 7, 14],
  ]);
  const [segment] = resolveSegments([temperatures, flow]);
  expect([...segment!.columns.supplyC!]).toEqual([6, 6.2, 6.4, NaN]);
  expect([...segment!.columns.returnC!]).toEqual([12, 12.4, 12.8, NaN]);
  expect([...segment!.columns.quality]).toEqual([0, 0, 0, RowQuality.noReading]);
});

test("supply and return may come from two further files, each in two downloads", () => {
  const flow = source([
    [0, 10, null, null],
    [7, 10, null, null],
    [15, 10, null, null],
  ]);
  const supply = [
    source([
      [0, null, 6, null],
      [5, null, 6, null],
    ]),
    source([
      [10, null, 8, null],
      [15, null, 8, null],
    ]),
  ];
  const back = source([
    [0, null, null, 12],
    [10, null, null, 13],
    [20, null, null, 14],
  ]);
  const [segment] = resolveSegments([...supply, flow, back]);
  expect([...segment!.columns.supplyC!].map((c) => Number(c.toFixed(6)))).toEqual([6, 6.8, 8]);
  expect([...segment!.columns.returnC!].map((c) => Number(c.toFixed(6)))).toEqual([12, 12.7, 13.5]);
});

test("without any flow the temperatures stand alone", () => {
  const [segment] = resolveSegments([
    source([
      [0, null, 6, 12],
      [5, null, 7, 14],
    ]),
  ]);
  expect(segment!.columns.flowM3PerHour).toBeNull();
  expect([...segment!.columns.supplyC!]).toEqual([6, 7]);
});
