import { gzipSync } from "node:zlib";
import type { SeriesAnswer } from "@shared/contracts/energy";

const gzipped = (value: unknown) => gzipSync(JSON.stringify(value), { level: 1 }).length;

/** Bytes of a chart's answer as we send it, and of the same values as one object a column. */
export function chartBytes(series: SeriesAnswer): { ours: number; rows: number; columns: number } {
  const { t0Ms, averagedOverS, tMs, envelope } = series;
  const stepMs = (averagedOverS ?? 0) * 1000;
  const rows = series.supplyC.map((supplyC, i) => ({
    time: new Date(t0Ms + (tMs?.[i] ?? i * stepMs)).toISOString(),
    supplyC,
    returnC: series.returnC[i],
    flowM3PerHour: series.flowM3PerHour[i],
    powerKw: series.powerKw[i],
    supplyLeastC: envelope?.supplyLeastC[i],
    supplyGreatestC: envelope?.supplyGreatestC[i],
    returnLeastC: envelope?.returnLeastC[i],
    returnGreatestC: envelope?.returnGreatestC[i],
    flowGreatestM3PerHour: envelope?.flowGreatestM3PerHour[i],
  }));
  return { ours: gzipped(series), rows: gzipped(rows), columns: rows.length };
}
