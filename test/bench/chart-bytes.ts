import { gzipSync } from "node:zlib";
import type { SeriesAnswer } from "@shared/contracts/energy";
import { unpackNumbers } from "@shared/domain/readings/packed-numbers";

const gzipped = (value: unknown) => gzipSync(JSON.stringify(value), { level: 1 }).length;

/** Bytes of a chart's answer as we send it, and of the same values as one object a column. */
export function chartBytes(series: SeriesAnswer): { ours: number; rows: number; columns: number } {
  const { t0Ms, averagedOverS, envelope, supplyC, returnC, flowM3PerHour, powerKw } = series;
  if (averagedOverS === null) throw new Error("the chart of a year has columns of rows");
  const packed = { supplyC, returnC, flowM3PerHour, powerKw, ...envelope };
  const columns = Object.entries(packed).map(
    ([name, numbers]) => [name, unpackNumbers(numbers)] as const,
  );
  const rows = Array.from(unpackNumbers(supplyC), (_, i) => ({
    time: new Date(t0Ms + i * averagedOverS * 1000).toISOString(),
    ...Object.fromEntries(columns.map(([name, values]) => [name, values[i]])),
  }));
  return { ours: gzipped(series), rows: gzipped(rows), columns: rows.length };
}
