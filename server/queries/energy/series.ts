import type { SeriesAnswer } from "@shared/contracts/energy";
import { samplePower } from "@shared/domain/energy/power";
import { INTERVAL_MS } from "@shared/domain/energy/interval-energy";
import { chartColumns, type ChartColumns } from "@shared/domain/readings/chart-columns";
import { qualityRuns } from "@shared/domain/readings/quality-runs";
import type { ReadingSegment } from "@shared/domain/readings/reading-columns";
import type { Interval } from "@shared/domain/time/interval";
import { localDateOf, startOfLocalDay } from "@shared/domain/time/local-calendar";
import { selectMany } from "@server/database/bulk";
import type { Database } from "@server/database/connect";
import { roundedOrNull } from "@server/presenters/present-energy";
import { powerOptionsOf } from "@server/readings/energy-settings";
import { loadSegments } from "@server/readings/load-segments";
import type { EnergyPoint } from "./energy-point";
import { screenQuality } from "./screen-quality";

/** A column narrower than two pixels shows nothing that a wider one hides. */
const pixelsPerColumn = 2;

/**
 * What a chart `pixels` wide can draw of a range: columns of means with their extremes, or the rows
 * themselves where they are few. At most two points a pixel for each line, whatever the range.
 */
export async function chartSeries(
  database: Database,
  energyPoint: EnergyPoint,
  range: Interval,
  pixels: number,
  nowMs: number,
): Promise<SeriesAnswer> {
  const { point, site, readings } = energyPoint;
  const segments = await loadSegments(database, point.id, range.startMs, range.endMs);
  const columns = chartColumns(segments, {
    ...range,
    most: Math.floor(pixels / pixelsPerColumn),
    anchorMs: startOfLocalDay(localDateOf(range.startMs, site.zone), site.zone),
  });
  const power = await powerOf(database, energyPoint, segments, columns);
  const seen = { startMs: range.startMs, endMs: Math.min(range.endMs, nowMs) };
  const quality = seen.endMs > seen.startMs ? qualityRuns(segments, seen) : [];
  const t0Ms = columns.startMs[0] ?? range.startMs;
  const { envelope, columnMs } = columns;
  return {
    zone: site.zone,
    fromMs: range.startMs,
    toMs: range.endMs,
    nominalStepS: readings.nominalStepMs === null ? null : readings.nominalStepMs / 1000,
    rows: columns.rows,
    averagedOverS: columnMs === null ? null : columnMs / 1000,
    t0Ms,
    tMs: columnMs === null ? Array.from(columns.startMs, (ms) => ms - t0Ms) : null,
    supplyC: decimals(columns.supplyC, 2),
    returnC: decimals(columns.returnC, 2),
    flowM3PerHour: digits(columns.flowM3PerHour),
    powerKw: digits(power),
    envelope: envelope && {
      supplyLeastC: decimals(envelope.supplyLeastC, 2),
      supplyGreatestC: decimals(envelope.supplyGreatestC, 2),
      returnLeastC: decimals(envelope.returnLeastC, 2),
      returnGreatestC: decimals(envelope.returnGreatestC, 2),
      flowGreatestM3PerHour: digits(envelope.flowGreatestM3PerHour),
    },
    quality: screenQuality(quality, (range.endMs - range.startMs) / pixels),
    yExtent: {
      temperatureC: extent(
        envelope
          ? [
              envelope.supplyLeastC,
              envelope.supplyGreatestC,
              envelope.returnLeastC,
              envelope.returnGreatestC,
            ]
          : [columns.supplyC, columns.returnC],
      ),
      flowM3PerHour: extent([columns.flowM3PerHour]),
    },
  };
}

function decimals(values: Float64Array, places: number): (number | null)[] {
  return Array.from(values, (value) => roundedOrNull(value, places));
}

/** Four significant digits: a trickle keeps its digits and a main does not drag useless ones. */
function digits(values: Float64Array): (number | null)[] {
  return Array.from(values, (value) => (Number.isNaN(value) ? null : Number(value.toPrecision(4))));
}

function extent(channels: readonly Float64Array[]): [number, number] | null {
  let least = Infinity;
  let greatest = -Infinity;
  for (const channel of channels) {
    for (const value of channel) {
      // NaN fails both comparisons.
      if (value < least) least = value;
      if (value > greatest) greatest = value;
    }
  }
  return least <= greatest ? [least, greatest] : null;
}

/** Mean power of each column, kW, heating positive; from stored energy where columns are wide. */
async function powerOf(
  database: Database,
  { point, settings }: EnergyPoint,
  segments: readonly ReadingSegment[],
  columns: ChartColumns,
): Promise<Float64Array> {
  const { columnMs, startMs } = columns;
  if (columnMs !== null && columnMs % INTERVAL_MS === 0)
    return storedPower(database, point.id, startMs, columnMs);
  const options = powerOptionsOf(settings);
  if (options === null) return new Float64Array(startMs.length).fill(NaN);
  const sums = new Float64Array(startMs.length);
  const counts = new Uint32Array(startMs.length);
  for (const segment of segments) {
    const { powerKw } = samplePower(segment.columns, options);
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

async function storedPower(
  database: Database,
  pointId: string,
  startMs: Float64Array,
  columnMs: number,
): Promise<Float64Array> {
  const power = new Float64Array(startMs.length).fill(NaN);
  const first = startMs[0];
  if (first === undefined) return power;
  const endS = (first + startMs.length * columnMs) / 1000;
  const rows = await selectMany(
    database,
    `SELECT (start_s - ?) DIV ? AS place, SUM(COALESCE(heating_kwh, 0) - COALESCE(cooling_kwh, 0)),
            SUM(COALESCE(covered_s, ?))
       FROM interval_energy WHERE point_id = ? AND start_s >= ? AND start_s < ?
      GROUP BY place`,
    [first / 1000, columnMs / 1000, INTERVAL_MS / 1000, pointId, first / 1000, endS],
  );
  for (const [place, kwh, coveredS] of rows) {
    if (Number(coveredS) > 0) power[Number(place)] = Number(kwh) / (Number(coveredS) / 3600);
  }
  return power;
}
