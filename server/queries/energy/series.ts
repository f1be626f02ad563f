import type { SeriesAnswer } from "@shared/contracts/energy";
import { INTERVAL_MS } from "@shared/domain/energy/interval-energy";
import {
  ChartBuilder,
  columnFrame,
  type ChartColumns,
  type ChartWindow,
  type ColumnFrame,
} from "@shared/domain/readings/chart-columns";
import { packNumbers, type PackedNumbers } from "@shared/domain/readings/packed-numbers";
import { qualityRuns, type QualityRun } from "@shared/domain/readings/quality-runs";
import type { ReadingSegment } from "@shared/domain/readings/reading-columns";
import type { Interval } from "@shared/domain/time/interval";
import { localDateOf, startOfLocalDay } from "@shared/domain/time/local-calendar";
import { selectMany } from "@server/database/bulk";
import type { Database } from "@server/database/connect";
import { filledStretches } from "@server/readings/energy-fills";
import { indexFrom, sliceColumns } from "@server/readings/load-segments";
import { isStored, powerOfRows, storedPower } from "./column-power";
import type { EnergyPoint } from "./energy-point";
import { withFills, type ShownRun } from "./filled-runs";
import { intervalColumns, intervalQuality } from "./interval-columns";
import { appendRuns } from "./left-out";
import { readingParts } from "./reading-parts";
import { screenQuality } from "./screen-quality";

/** A column narrower than two pixels shows nothing that a wider one hides. */
const pixelsPerColumn = 2;
/** Beyond this many rows a picture from quarter-hours comes at once, one from rows after a second. */
const mostRows = 3_000_000;

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
  const { point, site } = energyPoint;
  const window: ChartWindow = {
    ...range,
    most: Math.floor(pixels / pixelsPerColumn),
    anchorMs: startOfLocalDay(localDateOf(range.startMs, site.zone), site.zone),
  };
  const seen = { startMs: range.startMs, endMs: Math.min(range.endMs, nowMs) };
  const held = await rowsBehind(database, point.id, range);
  const frame = columnFrame(window);
  const drawn =
    held > mostRows
      ? await fromIntervals(database, energyPoint, window, seen)
      : // Fewer rows than columns are drawn as they are, whatever the columns' length would be.
        held > window.most && isStored(frame)
        ? await fromManyReadings(database, energyPoint, window, seen, frame)
        : await fromReadings(database, energyPoint, window, seen);
  const filled = await filledStretches(database, point.id, range);
  return present(
    energyPoint,
    range,
    { ...drawn, quality: withFills(drawn.quality, filled) },
    pixels,
  );
}

interface Drawn {
  readonly columns: ChartColumns;
  /** kW, heating positive. */
  readonly power: Float64Array;
  readonly quality: readonly QualityRun[];
}

async function rowsBehind(database: Database, pointId: string, range: Interval): Promise<number> {
  const day = (ms: number) => new Date(ms).toISOString().slice(0, 10);
  const [row] = await selectMany(
    database,
    "SELECT SUM(row_count) FROM reading_block WHERE point_id = ? AND day >= ? AND day <= ?",
    [pointId, day(range.startMs), day(range.endMs)],
  );
  return Number(row?.[0] ?? 0);
}

interface ChartOfReadings {
  readonly chart: ChartBuilder;
  readonly quality: readonly QualityRun[];
  /** The rows themselves, unless they became columns of means as they came. */
  readonly segments: readonly ReadingSegment[];
}

async function readChart(
  database: Database,
  pointId: string,
  window: ChartWindow,
  seen: Interval,
  keepsRows: boolean,
): Promise<ChartOfReadings> {
  const chart = new ChartBuilder(window);
  const quality: QualityRun[] = [];
  let segments: ReadingSegment[] = [];
  for await (const part of readingParts(database, pointId, window)) {
    const until = Math.min(part.endMs, seen.endMs);
    if (until > part.startMs)
      appendRuns(
        quality,
        qualityRuns(part.segments, { startMs: part.startMs, endMs: until }, part.gapFactor),
      );
    // The rows beyond a part's ends come again in its neighbours.
    const inside = part.segments.map((segment) => within(segment, part));
    chart.add(inside);
    segments = keepsRows || chart.isOfRows ? [...segments, ...inside] : [];
  }
  return { chart, quality, segments };
}

async function fromReadings(
  database: Database,
  { point, settings }: EnergyPoint,
  window: ChartWindow,
  seen: Interval,
): Promise<Drawn> {
  const { chart, quality, segments } = await readChart(database, point.id, window, seen, true);
  const columns = chart.columns();
  return { columns, quality, power: powerOfRows(settings, segments, columns) };
}

/** The same where the stored energy knows the columns' power: it is asked while the rows are read. */
async function fromManyReadings(
  database: Database,
  { point, settings }: EnergyPoint,
  window: ChartWindow,
  seen: Interval,
  frame: ColumnFrame,
): Promise<Drawn> {
  const [{ chart, quality, segments }, stored] = await Promise.all([
    readChart(database, point.id, window, seen, false),
    storedPower(database, point.id, frame),
  ]);
  const columns = chart.columns();
  return {
    columns,
    quality,
    power: chart.isOfRows ? powerOfRows(settings, segments, columns) : stored,
  };
}

function within(segment: ReadingSegment, { startMs, endMs }: Interval): ReadingSegment {
  const { instantMs } = segment.columns;
  const from = indexFrom(instantMs, startMs);
  const to = indexFrom(instantMs, endMs);
  return { ...segment, columns: sliceColumns(segment.columns, from, to) };
}

async function fromIntervals(
  database: Database,
  { point }: EnergyPoint,
  window: ChartWindow,
  seen: Interval,
): Promise<Drawn> {
  const frame = columnFrame(window, INTERVAL_MS);
  const [columns, quality, power] = await Promise.all([
    intervalColumns(database, point.id, window, frame),
    intervalQuality(database, point.id, seen),
    storedPower(database, point.id, frame),
  ]);
  return { columns, quality, power };
}

function present(
  { site, readings }: EnergyPoint,
  range: Interval,
  { columns, power, quality }: Omit<Drawn, "quality"> & { quality: readonly ShownRun[] },
  pixels: number,
): SeriesAnswer {
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
    tMs:
      columnMs === null
        ? packNumbers(
            columns.startMs.map((ms) => ms - t0Ms),
            0,
          )
        : null,
    supplyC: temperatures(columns.supplyC),
    returnC: temperatures(columns.returnC),
    flowM3PerHour: digits(columns.flowM3PerHour),
    powerKw: digits(power),
    envelope: envelope && {
      supplyLeastC: temperatures(envelope.supplyLeastC),
      supplyGreatestC: temperatures(envelope.supplyGreatestC),
      returnLeastC: temperatures(envelope.returnLeastC),
      returnGreatestC: temperatures(envelope.returnGreatestC),
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
      flowM3PerHour: extent(
        envelope
          ? [columns.flowM3PerHour, envelope.flowGreatestM3PerHour]
          : [columns.flowM3PerHour],
      ),
    },
  };
}

function temperatures(values: Float64Array): PackedNumbers {
  return packNumbers(values, 2);
}

const significant = 4;
/** A trickle this much smaller than the column's greatest is no longer told from nothing. */
const widestDigits = 7;

/** Four significant digits: a trickle keeps its digits and a main does not drag useless ones. */
function digits(values: Float64Array): PackedNumbers {
  const shown = values.map((value) => Number(value.toPrecision(significant)));
  const greatest = shown.reduce((best, value) => Math.max(best, Math.abs(value) || 0), 0);
  const whole = greatest > 0 ? Math.floor(Math.log10(greatest)) + 1 : 0;
  const most = Math.min(9, Math.max(0, widestDigits - whole));
  let decimals = 0;
  for (const value of shown) while (decimals < most && !isWhole(value, decimals)) decimals++;
  return packNumbers(shown, decimals);
}

/** NaN has no decimals to keep. */
function isWhole(value: number, decimals: number): boolean {
  const scale = 10 ** decimals;
  return Number.isNaN(value) || Math.round(value * scale) / scale === value;
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
