import { INTERVAL_MS } from "@shared/domain/energy/interval-energy";
import {
  columnStarts,
  type ChartColumns,
  type ColumnFrame,
} from "@shared/domain/readings/chart-columns";
import type { QualityRun } from "@shared/domain/readings/quality-runs";
import type { Interval } from "@shared/domain/time/interval";
import { ROUNDING_S } from "@shared/domain/energy/totals";
import { selectMany } from "@server/database/bulk";
import type { Database } from "@server/database/connect";

const intervalS = INTERVAL_MS / 1000;

/**
 * A chart's columns from stored quarter-hours, for ranges with millions of rows: means of the same
 * readings, without their extremes, in a fraction of the time.
 */
export async function intervalColumns(
  database: Database,
  pointId: string,
  window: Interval,
  frame: ColumnFrame,
): Promise<ChartColumns> {
  const { firstMs, columnMs, count } = frame;
  const column = () => new Float64Array(count).fill(NaN);
  const [flow, supply, back] = [column(), column(), column()];
  const rows = await selectMany(
    database,
    // Time that only a meter's power speaks for holds no flow and no temperature.
    `SELECT (start_s - ?) DIV ? AS place,
            SUM(COALESCE(covered_s, ?) - COALESCE(meter_only_s, 0)) AS water,
            SUM(COALESCE(volume_m3, COALESCE(heating_m3, 0) + COALESCE(cooling_m3, 0))),
            SUM(supply_c * (COALESCE(covered_s, ?) - COALESCE(meter_only_s, 0))),
            SUM(return_c * (COALESCE(covered_s, ?) - COALESCE(meter_only_s, 0))),
            SUM(COALESCE(measured_rows, 0) + COALESCE(excluded_rows, 0) + COALESCE(no_reading_rows, 0))
       FROM interval_energy WHERE point_id = ? AND start_s >= ? AND start_s < ?
      GROUP BY place`,
    [
      firstMs / 1000,
      columnMs / 1000,
      ...[intervalS, intervalS, intervalS],
      pointId,
      Math.max(firstMs, window.startMs) / 1000,
      window.endMs / 1000,
    ],
  );
  let total = 0;
  for (const [place, water, volume, supplyCs, returnCs, held] of rows) {
    total += Number(held);
    const waterS = Number(water);
    if (waterS < ROUNDING_S) continue;
    flow[Number(place)] = Number(volume) / (waterS / 3600);
    supply[Number(place)] = Number(supplyCs) / waterS;
    back[Number(place)] = Number(returnCs) / waterS;
  }
  return {
    startMs: columnStarts(frame),
    columnMs,
    flowM3PerHour: flow,
    supplyC: supply,
    returnC: back,
    envelope: null,
    rows: total,
  };
}

/** A quarter-hour counts as measured where this much of it is covered. */
const mostOfIt = 0.9;

/** Runs of quality by the quarter-hour, from what is stored of each. */
export async function intervalQuality(
  database: Database,
  pointId: string,
  window: Interval,
): Promise<QualityRun[]> {
  const rows = await selectMany(
    database,
    `SELECT start_s, COALESCE(covered_s, ?), COALESCE(excluded_rows, 0),
            COALESCE(no_reading_rows, 0) FROM interval_energy
      WHERE point_id = ? AND start_s >= ? AND start_s < ? ORDER BY start_s`,
    [intervalS, pointId, window.startMs / 1000, window.endMs / 1000],
  );
  const runs: QualityRun[] = [];
  let openMs = window.startMs;
  const put = (endMs: number, kind: QualityRun["kind"], rowsLost: number) => {
    if (endMs <= openMs) return;
    const last = runs.at(-1);
    if (last?.kind === kind) runs[runs.length - 1] = { ...last, endMs, rows: last.rows + rowsLost };
    else {
      const reason = kind === "measured" ? null : kind === "excluded" ? "weakSignal" : "noRows";
      runs.push({ startMs: openMs, endMs, kind, rows: rowsLost, reason });
    }
    openMs = endMs;
  };
  for (const [startS, coveredS, excluded, noReading] of rows) {
    const startMs = Number(startS) * 1000;
    put(startMs, "missing", 1);
    const measured = Number(coveredS) >= mostOfIt * intervalS;
    const kind = measured ? "measured" : Number(excluded) > 0 ? "excluded" : "missing";
    const lost = measured ? 0 : Math.max(1, Number(excluded) + Number(noReading));
    put(Math.min(startMs + INTERVAL_MS, window.endMs), kind, lost);
  }
  put(window.endMs, "missing", 1);
  return runs;
}
