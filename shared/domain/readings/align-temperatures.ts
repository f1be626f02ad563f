import { RowQuality } from "./reading-columns";

/**
 * Temperatures of one file at the flow instants of another, by the straight line between the two
 * readings round the instant, and only where those are at most two nominal temperature steps apart
 * (one reading may be missing, and a tenth of a step of jitter is allowed). Nothing is carried
 * beyond a first or last reading: unknown stays NaN. Excluded and missing readings are not used.
 *
 * Example: 20.0 °C at 12:00 and 21.0 °C at 12:05, step 5 min → 20.2 °C at 12:01.
 */
export const MOST_STEPS_APART = 2;
const JITTER_STEPS = 0.1;

export interface TemperatureSeries {
  /** Ascending, UTC ms. */
  readonly instantMs: Float64Array;
  readonly temperatureC: Float64Array;
  /** Row quality codes; null where every row counts. */
  readonly quality: Uint8Array | null;
  /** One step for the whole series, or the step that holds at each row. */
  readonly nominalStepMs: number | Float64Array;
}

export function alignTemperatures(
  flowInstantMs: Float64Array,
  series: TemperatureSeries,
): Float64Array {
  const { instantMs, temperatureC, quality, nominalStepMs } = series;
  const count = instantMs.length;
  const aligned = new Float64Array(flowInstantMs.length).fill(NaN);
  const counts = (row: number) =>
    (quality === null || quality[row] === RowQuality.measured) && !Number.isNaN(temperatureC[row]!);
  const stepAt = (row: number) =>
    typeof nominalStepMs === "number" ? nominalStepMs : nominalStepMs[row]!;
  let before = -1;
  let after = 0;
  while (after < count && !counts(after)) after++;
  for (let i = 0; i < flowInstantMs.length; i++) {
    const instant = flowInstantMs[i]!;
    while (after < count && instantMs[after]! <= instant) {
      before = after++;
      while (after < count && !counts(after)) after++;
    }
    if (before < 0) continue;
    if (instantMs[before] === instant) {
      aligned[i] = temperatureC[before]!;
    } else if (after < count) {
      const from = instantMs[before]!;
      const apart = instantMs[after]! - from;
      const step = Math.max(stepAt(before), stepAt(after));
      if (apart <= (MOST_STEPS_APART + JITTER_STEPS) * step) {
        const share = (instant - from) / apart;
        aligned[i] = temperatureC[before]! + share * (temperatureC[after]! - temperatureC[before]!);
      }
    }
  }
  return aligned;
}
