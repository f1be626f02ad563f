import type { Interval } from "../time/interval";
import { alignTemperatures } from "./align-temperatures";
import { columnLengthMs } from "./chart-columns";
import { SURVEY_GAP_FACTOR } from "./covered-steps";
import { mergeSeries } from "./merge-series";
import { nominalStepMs as medianStepMs } from "./nominal-step";
import type { CompanionChannel } from "./reading-columns";
import type { ReadingSource } from "./resolve-segments";

/** One companion series of a point: outdoor temperature in °C, electric power in kW or pressure in kPa. */
export interface CompanionSeries {
  /** Ascending, UTC ms, each once. */
  readonly instantMs: Float64Array;
  /** NaN is no reading. */
  readonly values: Float64Array;
  /** The logger's step at each row. */
  readonly nominalStepMs: Float64Array;
}

/**
 * One companion series from all files that hold it: at equal instants the file of higher precedence
 * wins, as for readings. Null where no file does. It is never resolved into segments, so no energy
 * can come of it.
 */
export function companionSeries(
  sources: readonly ReadingSource[],
  channel: CompanionChannel,
): CompanionSeries | null {
  const holding = sources.flatMap(({ columns, precedence, kind, nominalStepMs }) => {
    const values = columns[channel];
    const { instantMs } = columns;
    if (!values || instantMs.length === 0) return [];
    const stepMs = nominalStepMs ?? medianStepMs(instantMs) ?? 0;
    return [{ precedence, kind, nominalStepMs: stepMs, instantMs, values }];
  });
  if (holding.length === 0) return null;
  const runs = mergeSeries(holding);
  const length = runs.reduce((sum, run) => sum + run.length, 0);
  const series = {
    instantMs: new Float64Array(length),
    values: new Float64Array(length),
    nominalStepMs: new Float64Array(length),
  };
  let at = 0;
  for (const { source, row, length: rows } of runs) {
    const from = holding[source]!;
    series.instantMs.set(from.instantMs.subarray(row, row + rows), at);
    series.values.set(from.values.subarray(row, row + rows), at);
    series.nominalStepMs.fill(from.nominalStepMs, at, at + rows);
    at += rows;
  }
  return series;
}

/**
 * A companion's readings at other instants, by the straight line between the two round each and only
 * where those are at most two steps apart: see {@link alignTemperatures}.
 */
export function companionAt(instantMs: Float64Array, series: CompanionSeries): Float64Array {
  return alignTemperatures(instantMs, {
    instantMs: series.instantMs,
    temperatureC: series.values,
    quality: null,
    nominalStepMs: series.nominalStepMs,
  });
}

/** What a chart draws of a companion series; NaN lifts the pen. */
export interface CompanionColumns {
  readonly startMs: Float64Array;
  readonly values: Float64Array;
  /** Length of every column, whose value is the mean of its rows; null where columns are rows. */
  readonly columnMs: number | null;
  /** Rows with a reading inside the window. */
  readonly rows: number;
}

/**
 * A series inside a window as at most `most` points: its rows where they are few, else means over
 * columns of one round length.
 * Example: 288 readings of a day on 24 columns become hourly means.
 */
export function companionColumns(
  { instantMs, values, nominalStepMs }: CompanionSeries,
  window: Interval,
  most: number,
): CompanionColumns {
  const inside: number[] = [];
  instantMs.forEach((ms, row) => {
    if (ms >= window.startMs && ms < window.endMs) inside.push(row);
  });
  const rows = inside.filter((row) => !Number.isNaN(values[row])).length;
  if (inside.length <= most) {
    const starts: number[] = [];
    const drawn: number[] = [];
    inside.forEach((row, k) => {
      const at = instantMs[row]!;
      const before = k === 0 ? at : instantMs[inside[k - 1]!]!;
      if (at - before > SURVEY_GAP_FACTOR * nominalStepMs[row]!) {
        starts.push((at + before) / 2);
        drawn.push(NaN);
      }
      starts.push(at);
      drawn.push(values[row]!);
    });
    return {
      startMs: Float64Array.from(starts),
      values: Float64Array.from(drawn),
      columnMs: null,
      rows,
    };
  }
  const columnMs = columnLengthMs(window, most);
  const count = Math.ceil((window.endMs - window.startMs) / columnMs);
  const sums = new Float64Array(count);
  const counts = new Float64Array(count);
  for (const row of inside) {
    const value = values[row]!;
    if (Number.isNaN(value)) continue;
    const column = Math.floor((instantMs[row]! - window.startMs) / columnMs);
    sums[column] = sums[column]! + value;
    counts[column] = counts[column]! + 1;
  }
  return {
    startMs: sums.map((_, i) => window.startMs + i * columnMs),
    values: sums.map((sum, i) => (counts[i] === 0 ? NaN : sum / counts[i]!)),
    columnMs,
    rows,
  };
}
