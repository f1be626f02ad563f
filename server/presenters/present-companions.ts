import type { CompanionSeriesAnswer } from "@shared/contracts/companions";
import { companionColumns, type CompanionSeries } from "@shared/domain/readings/companion-series";
import { packNumbers } from "@shared/domain/readings/packed-numbers";
import type { Interval } from "@shared/domain/time/interval";

const pixelsPerPoint = 2;
const decimals = 2;
const nothing = { instantMs: new Float64Array(0), values: new Float64Array(0) };

/** A companion series as a chart `pixels` wide draws it; null draws nothing. */
export function presentCompanionSeries(
  zone: string,
  range: Interval,
  series: CompanionSeries | null,
  pixels: number,
): CompanionSeriesAnswer {
  const drawn = companionColumns(
    series ?? { ...nothing, nominalStepMs: new Float64Array(0) },
    range,
    Math.floor(pixels / pixelsPerPoint),
  );
  const t0Ms = drawn.startMs[0] ?? range.startMs;
  const known = drawn.values.filter((value) => !Number.isNaN(value));
  return {
    zone,
    fromMs: range.startMs,
    toMs: range.endMs,
    rows: drawn.rows,
    averagedOverS: drawn.columnMs === null ? null : drawn.columnMs / 1000,
    t0Ms,
    tMs: packNumbers(
      drawn.startMs.map((ms) => ms - t0Ms),
      0,
    ),
    values: packNumbers(drawn.values, decimals),
    least: known.length === 0 ? null : Math.min(...known),
    greatest: known.length === 0 ? null : Math.max(...known),
  };
}
