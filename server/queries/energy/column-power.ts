import { INTERVAL_MS } from "@shared/domain/energy/interval-energy";
import { segmentPower } from "@shared/domain/energy/segment-power";
import type { ChartColumns, ColumnFrame } from "@shared/domain/readings/chart-columns";
import type { ReadingSegment } from "@shared/domain/readings/reading-columns";
import { selectMany } from "@server/database/bulk";
import type { Database } from "@server/database/connect";
import { powerOptionsOf, type EnergySettings } from "@server/readings/energy-settings";

/** Whether every column is whole quarter-hours, so that {@link storedPower} knows its power. */
export function isStored({ columnMs }: ColumnFrame): boolean {
  return columnMs % INTERVAL_MS === 0;
}

/**
 * Mean power of each column of a chart from the rows in it, kW, heating positive; NaN where there is
 * none.
 */
export function powerOfRows(
  settings: EnergySettings,
  segments: readonly ReadingSegment[],
  { columnMs, startMs }: ChartColumns,
): Float64Array {
  const options = powerOptionsOf(settings);
  if (options === null) return new Float64Array(startMs.length).fill(NaN);
  const sums = new Float64Array(startMs.length);
  const counts = new Uint32Array(startMs.length);
  for (const segment of segments) {
    const { powerKw } = segmentPower(segment, options);
    let column = 0;
    segment.columns.instantMs.forEach((instant, row) => {
      const power = powerKw[row] as number;
      if (Number.isNaN(power)) return;
      while (column + 1 < startMs.length && (startMs[column + 1] as number) <= instant) column++;
      const start = startMs[column] as number;
      const inside = columnMs === null ? instant === start : instant < start + columnMs;
      if (instant < start || !inside) return;
      sums[column] = (sums[column] as number) + power;
      counts[column] = (counts[column] as number) + 1;
    });
  }
  return sums.map((sum, column) => sum / (counts[column] as number));
}

/** The same of columns that are whole quarter-hours, from the stored energy alone. */
export async function storedPower(
  database: Database,
  pointId: string,
  { firstMs, columnMs, count }: ColumnFrame,
): Promise<Float64Array> {
  const power = new Float64Array(count).fill(NaN);
  const endS = (firstMs + count * columnMs) / 1000;
  const rows = await selectMany(
    database,
    `SELECT (start_s - ?) DIV ? AS place, SUM(COALESCE(heating_kwh, 0) - COALESCE(cooling_kwh, 0)),
            SUM(COALESCE(covered_s, ?))
       FROM interval_energy WHERE point_id = ? AND start_s >= ? AND start_s < ?
      GROUP BY place`,
    [firstMs / 1000, columnMs / 1000, INTERVAL_MS / 1000, pointId, firstMs / 1000, endS],
  );
  for (const [place, kwh, coveredS] of rows) {
    if (Number(coveredS) > 0) power[Number(place)] = Number(kwh) / (Number(coveredS) / 3600);
  }
  return power;
}
