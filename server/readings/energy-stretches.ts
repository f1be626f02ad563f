import { DAY_MS } from "@shared/domain/time/interval";
import type { LocalDay } from "@shared/domain/time/local-calendar";

/** Days worked out at a time, so that memory stays flat however long a point has been measured. */
const mostDays = 92;
/** Rows of them: a logger of seconds fills a quarter of a year with eight million. */
const mostRows = 500_000;

/**
 * Days in the stretches in which their energy is worked out. What a stretch costs while it is
 * worked out, and how long it takes until somebody who cancels is heard, is then the same for
 * every logger.
 * @param stepMs the shortest step of the readings; 0 where it is not known
 */
export function stretchesOf(days: readonly LocalDay[], stepMs: number): LocalDay[][] {
  const atOnce = Math.min(mostDays, Math.max(1, Math.floor((mostRows * stepMs) / DAY_MS)));
  const size = stepMs > 0 ? atOnce : mostDays;
  return Array.from({ length: Math.ceil(days.length / size) }, (_, i) =>
    days.slice(i * size, (i + 1) * size),
  );
}
