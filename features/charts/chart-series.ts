import type { SeriesAnswer } from "@shared/contracts/energy";
import { unpackNumbers, type PackedNumbers } from "@shared/domain/readings/packed-numbers";
import type { Interval } from "@shared/domain/time/interval";
import { toDisplay, type DisplayUnit } from "@shared/domain/units/display-units";

/** The units a chart shows its values in. */
export interface ChartUnits {
  readonly temperature: DisplayUnit;
  readonly temperatureDifference: DisplayUnit;
  readonly flow: DisplayUnit;
  readonly heatingPower: DisplayUnit;
  readonly coolingPower: DisplayUnit;
  readonly heatingEnergy: DisplayUnit;
  readonly coolingEnergy: DisplayUnit;
}

/** An answer of the server made ready to draw: in the units shown, NaN where there is nothing. */
export interface ChartSeries {
  readonly range: Interval;
  readonly nominalStepS: number | null;
  readonly averagedOverS: number | null;
  readonly rows: number;
  /** Edges of each column, UTC ms; a row's column reaches to the next row. */
  readonly startMs: Float64Array;
  readonly endMs: Float64Array;
  readonly supply: Float64Array;
  readonly return: Float64Array;
  readonly flow: Float64Array;
  /** kW, heating positive. */
  readonly powerKw: Float64Array;
  readonly envelope: {
    readonly supplyLeast: Float64Array;
    readonly supplyGreatest: Float64Array;
    readonly returnLeast: Float64Array;
    readonly returnGreatest: Float64Array;
  } | null;
  readonly quality: SeriesAnswer["quality"];
  readonly temperatureExtent: readonly [number, number] | null;
  readonly flowExtent: readonly [number, number] | null;
}

function shown(packed: PackedNumbers, unit: DisplayUnit): Float64Array {
  return unpackNumbers(packed).map((value) => toDisplay(value, unit));
}

function shownPair(
  pair: readonly [number, number] | null,
  unit: DisplayUnit,
): readonly [number, number] | null {
  return pair && [toDisplay(pair[0], unit), toDisplay(pair[1], unit)];
}

export function chartSeries(answer: SeriesAnswer, units: ChartUnits): ChartSeries {
  const { averagedOverS, t0Ms, tMs, envelope } = answer;
  const supplyC = unpackNumbers(answer.supplyC);
  const stepMs = (averagedOverS ?? answer.nominalStepS ?? 60) * 1000;
  const startMs = tMs
    ? unpackNumbers(tMs).map((offset) => t0Ms + offset)
    : supplyC.map((_, i) => t0Ms + i * stepMs);
  const endMs = startMs.map((at, i) => Math.min(startMs[i + 1] ?? Infinity, at + stepMs));
  const { temperature, flow } = units;
  return {
    range: { startMs: answer.fromMs, endMs: answer.toMs },
    nominalStepS: answer.nominalStepS,
    averagedOverS,
    rows: answer.rows,
    startMs,
    endMs,
    supply: supplyC.map((value) => toDisplay(value, temperature)),
    return: shown(answer.returnC, temperature),
    flow: shown(answer.flowM3PerHour, flow),
    powerKw: unpackNumbers(answer.powerKw),
    envelope: envelope && {
      supplyLeast: shown(envelope.supplyLeastC, temperature),
      supplyGreatest: shown(envelope.supplyGreatestC, temperature),
      returnLeast: shown(envelope.returnLeastC, temperature),
      returnGreatest: shown(envelope.returnGreatestC, temperature),
    },
    quality: answer.quality,
    temperatureExtent: shownPair(answer.yExtent.temperatureC, temperature),
    flowExtent: shownPair(answer.yExtent.flowM3PerHour, flow),
  };
}

/** The columns that touch the view, and one on each side so that curves run off its edges. */
export function visibleColumns(
  { startMs, endMs }: ChartSeries,
  view: Interval,
): readonly [number, number] {
  let from = 0;
  while (from < startMs.length && (endMs[from] as number) < view.startMs) from++;
  let to = from;
  while (to < startMs.length && (startMs[to] as number) <= view.endMs) to++;
  return [Math.max(0, from - 1), Math.min(startMs.length, to + 1)];
}

/** Whether a column holds anything to read: water, or a permanent meter's power. */
const holdsReading = ({ supply, flow, powerKw }: ChartSeries, i: number) =>
  !Number.isNaN(supply[i]) || !Number.isNaN(flow[i]) || !Number.isNaN(powerKw[i]);

/** Where a column's value is drawn: a row at its instant, a mean in the middle of its stretch. */
export function columnAt(series: ChartSeries, column: number): number {
  const start = series.startMs[column] ?? NaN;
  return series.averagedOverS === null ? start : (start + (series.endMs[column] ?? NaN)) / 2;
}

/** The column nearest to an instant, or null where there is none. */
export function nearestColumn(series: ChartSeries, instantMs: number): number | null {
  const count = series.startMs.length;
  if (count === 0) return null;
  let low = 0;
  let high = count - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (columnAt(series, middle) < instantMs) low = middle + 1;
    else high = middle;
  }
  const before = low - 1;
  if (before < 0) return low;
  return instantMs - columnAt(series, before) <= columnAt(series, low) - instantMs ? before : low;
}

/** The next column with a value after (`1`) or before (`-1`) the given one; itself at the ends. */
export function stepColumn(series: ChartSeries, from: number, direction: 1 | -1): number {
  for (let i = from + direction; i >= 0 && i < series.startMs.length; i += direction) {
    if (holdsReading(series, i)) return i;
  }
  return from;
}

/** The first (or last) column with a value, or null. */
export function endColumn(series: ChartSeries, end: "first" | "last"): number | null {
  const outside = end === "first" ? -1 : series.startMs.length;
  const found = stepColumn(series, outside, end === "first" ? 1 : -1);
  return found === outside ? null : found;
}
