import type { EnergySteps } from "../energy/demand";
import { stepPowerKw } from "./load-steps";

/**
 * Load duration curve: power in falling order over the hours it was reached or exceeded.
 *
 * Each step counts with its covered time; a hole is no hour at zero. The first point is the greatest
 * power at 0 h, the last the least power at all covered hours; both stay exact when points are
 * thinned. Source: the load duration curve of any power engineering handbook.
 *
 * Example: hours of 10, 30 and 20 kW: (0 h, 30), (1 h, 30), (2 h, 20), (3 h, 10).
 */
export interface DurationPoint {
  /** Hours during which power was at least `powerKw`. */
  readonly hours: number;
  readonly powerKw: number;
}

/** Every point, from most to least; empty where nothing is covered. */
export function durationCurve(steps: EnergySteps): DurationPoint[] {
  const order = Array.from(steps.startMs.keys()).filter((i) => steps.coveredS[i]! > 0);
  const power = Float64Array.from(steps.startMs, (_, i) => stepPowerKw(steps, i));
  order.sort((a, b) => power[b]! - power[a]!);
  const first = order[0];
  if (first === undefined) return [];
  const points: DurationPoint[] = [{ hours: 0, powerKw: power[first]! }];
  let seconds = 0;
  for (const i of order) {
    seconds += steps.coveredS[i]!;
    points.push({ hours: seconds / 3600, powerKw: power[i]! });
  }
  return points;
}

/**
 * At most `most` of the points, the two ends among them. They are spread evenly along the curve, by
 * the sum of hours ÷ all hours and fall ÷ whole fall, so neither axis jumps by more than
 * 2 ÷ (most − 1) of its length unless the curve itself does.
 */
export function thinnedCurve(points: readonly DurationPoint[], most = 200): DurationPoint[] {
  const first = points[0];
  const last = points.at(-1);
  if (points.length <= most || first === undefined || last === undefined) return [...points];
  const fallKw = first.powerKw - last.powerKw;
  const along = ({ hours, powerKw }: DurationPoint) =>
    hours / last.hours + (fallKw > 0 ? (first.powerKw - powerKw) / fallKw : 0);
  const step = along(last) / (most - 1);
  const kept: DurationPoint[] = [first];
  let at = 0;
  for (let k = 1; k < most - 1; k++) {
    const before = at;
    while (at + 2 < points.length && along(points[at + 1]!) <= k * step) at++;
    if (at > before) kept.push(points[at]!);
  }
  kept.push(last);
  return kept;
}
