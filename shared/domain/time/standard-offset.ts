import { zoneOffsets } from "./zone-offsets";

const QUARTER_YEAR_MS = 91 * 86_400_000;

/**
 * A zone's offset from UTC without summer time in the year round an instant, ms: the smaller of the
 * offsets in its four quarters. It holds all year for a logger that is never moved to summer time.
 * Example: Europe/Paris at any time of 2025 → one hour; Asia/Tokyo → nine hours.
 */
export function standardOffsetMs(zone: string, aroundMs: number): number {
  const offsets = zoneOffsets(zone);
  return Math.min(...[0, 1, 2, 3].map((k) => offsets.offsetAt(aroundMs + k * QUARTER_YEAR_MS)));
}
