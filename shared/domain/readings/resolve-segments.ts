import { alignTemperatures, type TemperatureSeries } from "./align-temperatures";
import { counterMeans, hasCounters, NO_COUNTER_FACTS, type CounterFacts } from "./counter-steps";
import { SURVEY_GAP_FACTOR } from "./covered-steps";
import { mergeSeries, sameSeries, type MergeSource, type Run } from "./merge-series";
import { nominalStepMs as medianStepMs } from "./nominal-step";
import { orientPower, type PositivePower } from "./orient-power";
import {
  COMPANION_CHANNELS,
  mapChannels,
  READING_CHANNELS,
  RowQuality,
  type ReadingChannel,
  type ReadingColumns,
  type ReadingSegment,
  type SeriesKind,
} from "./reading-columns";

/** What must be known of a permanent meter to read its power and its counters. */
export interface MeterFacts extends CounterFacts {
  /** What a positive power means; null where nobody has said and nothing tells. */
  readonly positivePower: PositivePower | null;
}

/** The rows that one file holds for one point. */
export interface ReadingSource {
  /** Greater wins where two files hold the same instant. */
  readonly precedence: number;
  readonly kind: SeriesKind;
  /** The logger's step; null where the file does not know it: then the median step is used. */
  readonly nominalStepMs: number | null;
  readonly columns: ReadingColumns;
  /** Only for files of a permanent meter. */
  readonly meter?: MeterFacts;
}

interface Prepared extends MergeSource {
  readonly columns: ReadingColumns;
  readonly meter: MeterFacts | null;
  /** How the channels beside a counter relate to their labels. */
  readonly beside: SeriesKind;
}

/**
 * Many files' rows of one point as segments that never overlap, ready to integrate.
 *
 * Files that carry flow, or the power or counters of a permanent meter, give the instants, the kind
 * and the step. A temperature that such a file does not carry is taken from the files that hold only
 * temperatures, through {@link alignTemperatures}. Where no file carries more, the temperatures stand
 * alone. Counters become means once the files are merged, so that a step may run from one file into
 * the next. Rows may come in any order. See {@link mergeSeries} for which file wins: a meter's power
 * wins over flow and temperatures of the same time, or loses to them, like any other file.
 */
export function resolveSegments(sources: readonly ReadingSource[]): ReadingSegment[] {
  const prepared = sources.filter(({ columns }) => holdsReadings(columns)).map(prepare);
  const leading = prepared.filter(({ columns }) => leads(columns));
  const temperatures = prepared.filter(({ columns }) => !leads(columns));
  if (leading.length === 0) return toSegments(temperatures);
  return toSegments(completeTemperatures(leading, temperatures).map(oriented));
}

/** Companion series alone are no readings: outdoor temperature must give no row and no coverage. */
function holdsReadings(columns: ReadingColumns): boolean {
  if (columns.instantMs.length === 0) return false;
  if (COMPANION_CHANNELS.every((channel) => !columns[channel])) return true;
  return READING_CHANNELS.some((channel) => !!columns[channel]);
}

/** Whether a file says how much moved, and so gives the instants. */
function leads(columns: ReadingColumns): boolean {
  return columns.flowM3PerHour !== null || !!columns.powerKw || hasCounters(columns);
}

function oriented(source: Prepared): Prepared {
  const { columns, meter } = source;
  if (!columns.powerKw || meter === null) return source;
  const powerKw = orientPower(columns.powerKw, meter.positivePower, columns);
  return powerKw === columns.powerKw ? source : { ...source, columns: { ...columns, powerKw } };
}

function prepare(source: ReadingSource): Prepared {
  const columns = ascending(source.columns);
  const counts = hasCounters(columns);
  const ownTemperatures = columns.supplyC !== null || columns.returnC !== null;
  const beside = ownTemperatures || columns.powerKw ? source.kind : "instantaneous";
  return {
    precedence: source.precedence,
    kind: counts ? "meanToLabel" : source.kind,
    counts,
    beside,
    meter: source.meter ?? null,
    // A single row knows no step: it speaks for no time of its own, only with its neighbours.
    nominalStepMs: source.nominalStepMs ?? medianStepMs(columns.instantMs) ?? 0,
    instantMs: columns.instantMs,
    columns,
  };
}

function completeTemperatures(withFlow: Prepared[], withoutFlow: Prepared[]): Prepared[] {
  const needs = (channel: "supplyC" | "returnC") =>
    withFlow.some((source) => source.columns[channel] === null);
  const supply = needs("supplyC") ? joinSeries(withoutFlow, "supplyC") : null;
  const returned = needs("returnC") ? joinSeries(withoutFlow, "returnC") : null;
  return withFlow.map((source) => {
    const { columns } = source;
    const supplyC = columns.supplyC ?? (supply && alignTemperatures(columns.instantMs, supply));
    const returnC = columns.returnC ?? (returned && alignTemperatures(columns.instantMs, returned));
    if (supplyC === columns.supplyC && returnC === columns.returnC) return source;
    return { ...source, columns: { ...columns, supplyC, returnC } };
  });
}

/** One temperature from all files that hold it, with the step that applies at each row. */
function joinSeries(
  sources: readonly Prepared[],
  channel: "supplyC" | "returnC",
): TemperatureSeries | null {
  const holding = sources.filter((source) => source.columns[channel] !== null);
  if (holding.length === 0) return null;
  const runs = mergeSeries(holding);
  const stepMs = new Float64Array(totalLength(runs));
  let at = 0;
  for (const { source, length } of runs) {
    stepMs.fill(holding[source]!.nominalStepMs, at, at + length);
    at += length;
  }
  const columns = gather(holding, runs);
  return {
    instantMs: columns.instantMs,
    temperatureC: columns[channel]!,
    quality: qualityFor(columns, channel),
    nominalStepMs: stepMs,
  };
}

/** "No reading" of a row is about any channel; for one temperature only its own NaN counts. */
function qualityFor(columns: ReadingColumns, channel: "supplyC" | "returnC"): Uint8Array {
  return columns.quality.map((code, row) =>
    code === RowQuality.noReading && !Number.isNaN(columns[channel]![row]!)
      ? RowQuality.measured
      : code,
  );
}

function toSegments(sources: readonly Prepared[]): ReadingSegment[] {
  const runs = mergeSeries(sources);
  const segments: ReadingSegment[] = [];
  let from = 0;
  while (from < runs.length) {
    const first = sources[runs[from]!.source]!;
    let to = from + 1;
    while (to < runs.length && sameSeries(first, sources[runs[to]!.source]!)) to++;
    const part = runs.slice(from, to);
    const nominalStepMs = Math.max(...part.map((run) => sources[run.source]!.nominalStepMs));
    const columns = gather(sources, part);
    segments.push({
      kind: first.kind,
      nominalStepMs,
      columns: first.counts
        ? counterMeans(columns, first.beside, nominalStepMs, factsOf(sources, part)).columns
        : marked(columns),
    });
    from = to;
  }
  return segments;
}

/** What is known of the meter behind several files: any file may say when it was exchanged. */
function factsOf(sources: readonly Prepared[], runs: readonly Run[]): CounterFacts {
  const [first, ...others] = [...new Set(runs.map((run) => run.source))].flatMap(
    (source) => sources[source]!.meter ?? [],
  );
  if (!first) return { ...NO_COUNTER_FACTS, gapFactor: SURVEY_GAP_FACTOR };
  const exchangesMs = [first, ...others].flatMap((meter) => meter.exchangesMs);
  return { ...first, exchangesMs };
}

function totalLength(runs: readonly Run[]): number {
  return runs.reduce((sum, run) => sum + run.length, 0);
}

/** The runs' rows as one set of columns; a channel that only some files hold is NaN elsewhere. */
function gather(sources: readonly Prepared[], runs: readonly Run[]): ReadingColumns {
  const [only] = runs;
  if (only && runs.length === 1 && only.length === sources[only.source]!.instantMs.length) {
    return sources[only.source]!.columns;
  }
  const length = totalLength(runs);
  const instantMs = new Float64Array(length);
  const quality = new Uint8Array(length);
  const channels: Partial<Record<ReadingChannel, Float64Array>> = {};
  for (const channel of READING_CHANNELS) {
    if (runs.some((run) => !!sources[run.source]!.columns[channel])) {
      channels[channel] = new Float64Array(length).fill(NaN);
    }
  }
  let at = 0;
  for (const run of runs) {
    const { columns } = sources[run.source]!;
    const end = run.row + run.length;
    instantMs.set(columns.instantMs.subarray(run.row, end), at);
    quality.set(columns.quality.subarray(run.row, end), at);
    for (const channel of READING_CHANNELS) {
      const held = columns[channel];
      if (held) channels[channel]!.set(held.subarray(run.row, end), at);
    }
    at += run.length;
  }
  return {
    instantMs,
    quality,
    flowM3PerHour: null,
    supplyC: null,
    returnC: null,
    signalPercent: null,
    ...channels,
  };
}

// Taken out of its module once: it is compared with in every row.
const MEASURED = RowQuality.measured;

/** Rows that lack a channel energy needs are "no reading", whoever left it out. */
function marked(columns: ReadingColumns): ReadingColumns {
  const { flowM3PerHour, supplyC, returnC, powerKw, quality } = columns;
  if (powerKw) return markedByMeter(columns, powerKw);
  if (!flowM3PerHour || !supplyC || !returnC) return columns;
  let copy: Uint8Array | null = null;
  for (let i = 0; i < quality.length; i++) {
    if (quality[i] !== MEASURED) continue;
    // The sum is NaN exactly when one of them is.
    const sum = flowM3PerHour[i]! + supplyC[i]! + returnC[i]!;
    if (sum === sum) continue;
    copy ??= quality.slice();
    copy[i] = RowQuality.noReading;
  }
  return copy ? { ...columns, quality: copy } : columns;
}

function markedByMeter(columns: ReadingColumns, powerKw: Float64Array): ReadingColumns {
  const { flowM3PerHour, supplyC, returnC } = columns;
  const known = (channel: Float64Array | null, row: number) => !Number.isNaN(channel?.[row] ?? NaN);
  const quality = columns.quality.map((code, row) =>
    code === MEASURED &&
    !known(powerKw, row) &&
    !(known(flowM3PerHour, row) && known(supplyC, row) && known(returnC, row))
      ? RowQuality.noReading
      : code,
  );
  return { ...columns, quality };
}

/** The columns sorted by instant, each instant once (the first written wins). */
function ascending(columns: ReadingColumns): ReadingColumns {
  const { instantMs } = columns;
  let sorted = true;
  for (let i = 1; i < instantMs.length && sorted; i++) sorted = instantMs[i]! > instantMs[i - 1]!;
  if (sorted) return columns;
  const order = Uint32Array.from(instantMs.keys()).sort(
    (a, b) => instantMs[a]! - instantMs[b]! || a - b,
  );
  const rows = order.filter((row, i) => i === 0 || instantMs[row] !== instantMs[order[i - 1]!]);
  const pick = (column: Float64Array) => Float64Array.from(rows, (row) => column[row]!);
  return {
    instantMs: pick(instantMs),
    quality: Uint8Array.from(rows, (row) => columns.quality[row]!),
    ...mapChannels(columns, pick),
  };
}
