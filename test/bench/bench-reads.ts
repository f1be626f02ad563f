import type { EnergyAnswer, SeriesAnswer } from "@shared/contracts/energy";
import type { Bench } from "./bench";
import { chartBytes } from "./chart-bytes";
import { YEAR } from "./log-year";
import { interleaved, seconds } from "./measure";
import { createRowTable, queryRows, type RowQuery } from "./peers/row-table";
import { time, times, type Line } from "./report";

const pixels = 1500;

/** G7, G8, G11: the year on a chart, by hour and by month, over HTTP, against SQL on a row a sample. */
export async function benchReads(
  { server, database, rounds }: Bench,
  pointId: string,
): Promise<Line[]> {
  await createRowTable(database, "row_table");
  await database.query("INSERT INTO row_table SELECT * FROM plain_sample");
  const fromS = YEAR.startMs / 1000;
  const toS = fromS + (YEAR.rowCount * YEAR.stepMs) / 1000;
  const range = `from=${new Date(fromS * 1000).toISOString()}&to=${new Date(toS * 1000).toISOString()}`;
  const series = (wide: number) =>
    server.get<SeriesAnswer>(`/points/${pointId}/series?${range}&pixels=${wide}`);
  const energy = (step: string) =>
    server.get<EnergyAnswer>(`/points/${pointId}/energy?${range}&step=${step}`);
  const sql = (query: RowQuery) => () =>
    seconds(() => queryRows(database, query, { fromS, toS, columns: pixels / 2 }));
  // Warm, as the goals are: the database has the year in memory and the code is compiled.
  for (let i = 0; i < 5; i++) await Promise.all([series(pixels), energy("hour"), energy("day")]);
  const took = await interleaved(Math.max(rounds, 5), {
    chart: () => seconds(() => series(pixels)),
    sqlChart: sql("chart"),
    hours: () => seconds(() => energy("hour")),
    sqlHours: sql("hours"),
    months: () => seconds(() => energy("day").then(monthlySums)),
    sqlMonths: sql("months"),
  });
  const widest = await series(4000);
  const sizes = chartBytes(widest);
  return [
    {
      goal: "G7",
      promise: "year chart ≥ 2× SQL on rows, ≤ 100 ms",
      ours: time(took.chart),
      peer: time(took.sqlChart),
      ratio: times(took.sqlChart / took.chart),
      met: took.sqlChart / took.chart >= 2 && took.chart <= 0.1,
    },
    {
      goal: "G8",
      promise: "year by hour ≥ 3× SQL on rows",
      ours: time(took.hours),
      peer: time(took.sqlHours),
      ratio: times(took.sqlHours / took.hours),
      met: took.sqlHours / took.hours >= 3,
    },
    {
      goal: "G8",
      promise: "(one point by month; the goal is of 50)",
      ours: time(took.months),
      peer: time(took.sqlMonths),
      ratio: times(took.sqlMonths / took.months),
      met: null,
    },
    {
      goal: "G11",
      promise: `chart of ${sizes.columns} columns ≤ 1/3 of row JSON, gzipped`,
      ours: `${(sizes.ours / 1000).toFixed(0)} KB`,
      peer: `${(sizes.rows / 1000).toFixed(0)} KB`,
      ratio: times(sizes.rows / sizes.ours),
      met: sizes.rows / sizes.ours >= 3,
    },
  ];
}

/** What a bill asks for, from the days the API gives. */
function monthlySums({ columns }: EnergyAnswer): Map<string, number> {
  const sums = new Map<string, number>();
  columns?.startMs.forEach((startMs, i) => {
    const month = new Date(startMs).toISOString().slice(0, 7);
    sums.set(month, (sums.get(month) ?? 0) + (columns.coolingKwh[i] ?? 0));
  });
  return sums;
}
