import type { ReadingColumns } from "../reading-columns";

/**
 * A logger's clock that was off. Instants become t + offset + drift·(t − reference), whole
 * milliseconds; `driftPerMs` is what the clock gains or loses in a millisecond.
 *
 * Example: 90 s slow on 3 March 12:00 and losing 2 s a day → 4 March 12:00 becomes 12:01:32.
 */
export interface ClockError {
  readonly offsetMs: number;
  readonly driftPerMs: number;
  readonly referenceMs: number;
}

/** Range |drift| < 1: a clock that stands or runs backwards tells no time. */
export function trueInstantMs(
  loggerMs: number,
  { offsetMs, driftPerMs, referenceMs }: ClockError,
): number {
  return Math.round(loggerMs + offsetMs + driftPerMs * (loggerMs - referenceMs));
}

/** What the logger's clock showed at an instant, to the millisecond's fraction. */
export function loggerInstantMs(
  trueMs: number,
  { offsetMs, driftPerMs, referenceMs }: ClockError,
): number {
  return (trueMs - offsetMs + driftPerMs * referenceMs) / (1 + driftPerMs);
}

/** The same rows at their true instants, still strictly ascending. */
export function correctClock(columns: ReadingColumns, error: ClockError): ReadingColumns {
  let before = -Infinity;
  const instantMs = columns.instantMs.map((loggerMs) => {
    // Rows a millisecond apart may round to one: the order they were read in stays.
    before = Math.max(trueInstantMs(loggerMs, error), before + 1);
    return before;
  });
  return { ...columns, instantMs };
}
