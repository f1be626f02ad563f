/** A stretch of time [startMs, endMs) in UTC milliseconds: the start belongs to it, the end does not. */
export interface Interval {
  readonly startMs: number;
  readonly endMs: number;
}

export const MINUTE_MS = 60_000;
export const HOUR_MS = 3_600_000;
export const DAY_MS = 86_400_000;

export function durationMs(interval: Interval): number {
  return interval.endMs - interval.startMs;
}

export function contains(interval: Interval, instantMs: number): boolean {
  return instantMs >= interval.startMs && instantMs < interval.endMs;
}

/** The part that both share, or null. Intervals that only touch share nothing. */
export function overlap(a: Interval, b: Interval): Interval | null {
  const startMs = Math.max(a.startMs, b.startMs);
  const endMs = Math.min(a.endMs, b.endMs);
  return startMs < endMs ? { startMs, endMs } : null;
}
