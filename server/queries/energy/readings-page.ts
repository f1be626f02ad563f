import type { CompanionName } from "@shared/contracts/companions";
import { segmentPower } from "@shared/domain/energy/segment-power";
import { RowQuality, type ReadingSegment } from "@shared/domain/readings/reading-columns";
import { DAY_MS, type Interval } from "@shared/domain/time/interval";
import type { Database } from "@server/database/connect";
import { powerOptionsOf } from "@server/readings/energy-settings";
import { companionAt } from "@shared/domain/readings/companion-series";
import { companionSpans, loadCompanions, type Companions } from "@server/readings/load-companions";
import { loadSegments } from "@server/readings/load-segments";
import { breathe } from "./breathe";
import type { EnergyPoint } from "./energy-point";

/** One reading as a table and a download show it; null is "no reading". */
export interface ReadingRow {
  readonly atMs: number;
  readonly flowM3PerHour: number | null;
  readonly supplyC: number | null;
  readonly returnC: number | null;
  readonly signalPercent: number | null;
  /** Signed, heating positive; null where the row carries no energy. */
  readonly powerKw: number | null;
  readonly quality: "measured" | "excluded" | "noReading";
  /** Companion series at the instant; null where none has a reading near it. */
  readonly outdoorC: number | null;
  readonly electricKw: number | null;
  readonly pressureKpa: number | null;
}

const qualityNames = {
  [RowQuality.measured]: "measured",
  [RowQuality.excluded]: "excluded",
  [RowQuality.noReading]: "noReading",
  [RowQuality.opening]: "measured",
} as const;

/**
 * Cleaned readings in order of time, unpacked a stretch at a time so that years of them never stand
 * in memory at once. Stretches without rows are skipped in ever longer strides.
 */
export async function* readingRows(
  database: Database,
  { point, settings, readings }: EnergyPoint,
  range: Interval,
): AsyncGenerator<ReadingRow[]> {
  const { firstMs, lastMs } = readings;
  if (firstMs === null || lastMs === null) return;
  const options = powerOptionsOf(settings);
  const endMs = Math.min(range.endMs, lastMs + 1);
  const usualMs =
    DAY_MS * Math.max(1, Math.min(30, ((readings.nominalStepMs ?? 0) * 2000) / DAY_MS));
  let strideMs = usualMs;
  const channels = (await companionSpans(database, point.id)).map(({ channel }) => channel);
  for (let fromMs = Math.max(range.startMs, firstMs); fromMs < endMs;) {
    const toMs = Math.min(fromMs + strideMs, endMs);
    const [segments, companions] = await Promise.all([
      loadSegments(database, point.id, fromMs, toMs),
      loadCompanions(database, point.id, channels, { startMs: fromMs, endMs: toMs }),
    ]);
    const rows = segments
      .flatMap((segment) =>
        rowsOf(segment, options ? segmentPower(segment, options).powerKw : null, companions, {
          startMs: fromMs,
          endMs: toMs,
        }),
      )
      .sort((a, b) => a.atMs - b.atMs);
    if (rows.length > 0) yield rows;
    strideMs = rows.length > 0 ? usualMs : strideMs * 2;
    fromMs = toMs;
    await breathe();
  }
}

function rowsOf(
  { columns }: ReadingSegment,
  powerKw: Float64Array | null,
  companions: Companions,
  { startMs, endMs }: Interval,
): ReadingRow[] {
  const { instantMs, quality, flowM3PerHour, supplyC, returnC, signalPercent } = columns;
  const value = (channel: Float64Array | null, row: number): number | null => {
    const read = channel?.[row];
    return read === undefined || Number.isNaN(read) ? null : read;
  };
  const beside = (channel: CompanionName) => {
    const series = companions[channel];
    return series ? companionAt(instantMs, series) : null;
  };
  const [outdoorC, electricKw, pressureKpa] = [
    beside("outdoor"),
    beside("electricPower"),
    beside("pressure"),
  ];
  const rows: ReadingRow[] = [];
  for (let row = 0; row < instantMs.length; row++) {
    const atMs = instantMs[row] as number;
    if (atMs < startMs || atMs >= endMs) continue;
    rows.push({
      atMs,
      flowM3PerHour: value(flowM3PerHour, row),
      supplyC: value(supplyC, row),
      returnC: value(returnC, row),
      signalPercent: value(signalPercent, row),
      powerKw: value(powerKw, row),
      quality: qualityNames[quality[row] as keyof typeof qualityNames],
      outdoorC: value(outdoorC, row),
      electricKw: value(electricKw, row),
      pressureKpa: value(pressureKpa, row),
    });
  }
  return rows;
}

/** The first `limit` rows of the range and where to go on; null at its end. */
export async function readingsPage(
  database: Database,
  energyPoint: EnergyPoint,
  range: Interval,
  limit: number,
): Promise<{ rows: ReadingRow[]; nextMs: number | null }> {
  const rows: ReadingRow[] = [];
  for await (const some of readingRows(database, energyPoint, range)) {
    rows.push(...some.slice(0, limit + 1 - rows.length));
    if (rows.length > limit) break;
  }
  const next = rows[limit];
  return { rows: rows.slice(0, limit), nextMs: next?.atMs ?? null };
}
