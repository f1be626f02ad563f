import type { Interval } from "@shared/domain/time/interval";
import type { LoadedPoint } from "./point-side";

/**
 * Whether one instrument stands behind both points within the range: its error is in both figures,
 * so they are no witnesses of each other. A side whose ± comes from a meter's class has its own meter.
 */
export function sharesInstruments(
  first: LoadedPoint,
  second: LoadedPoint,
  range: Interval,
): boolean {
  if (first.claimed !== null || second.claimed !== null) return false;
  const serials = serialsOf(first, range);
  return [...serialsOf(second, range)].some((serial) => serials.has(serial));
}

function serialsOf({ evidence }: LoadedPoint, { startMs, endMs }: Interval): Set<string> {
  const within = evidence.installations.filter(
    (one) => one.startMs < endMs && (one.endMs ?? Infinity) > startMs,
  );
  return new Set(
    within.flatMap(({ evidence: { flowMeter, probes } }) => [
      ...(flowMeter ? [`flow ${flowMeter.serial}`] : []),
      ...(probes ? [`probe ${probes.supply.serial}`, `probe ${probes.return.serial}`] : []),
    ]),
  );
}
