import { INTERVAL_MS } from "@shared/domain/energy/interval-energy";
import { DAY_MS, type Interval } from "@shared/domain/time/interval";
import { isLocalDate, localDateOf, startOfLocalDay } from "@shared/domain/time/local-calendar";
import { Invalid } from "@server/http/errors";

/** A range asked for, as UTC, and as whole local days where its ends are local midnights. */
export interface EnergyRange extends Interval {
  /** `[fromDate, toDate)` in the site's zone; null where an end is not a midnight. */
  readonly dates: { readonly from: string; readonly to: string } | null;
}

const mostYears = 30;

function refuse(field: string, code: string, message: string): Invalid {
  return new Invalid([{ pointer: `/query/${field}`, code, message }]);
}

/**
 * Reads `from` and `to`, both dates of the site's zone or both instants.
 * @throws Invalid (422) where they are mixed, empty, reversed or absurdly long.
 */
export function readRange({ from, to }: { from: string; to: string }, zone: string): EnergyRange {
  if (isLocalDate(from) !== isLocalDate(to))
    throw refuse("to", "mixed-range", "Give both ends as dates, or both as instants.");
  const startMs = isLocalDate(from) ? startOfLocalDay(from, zone) : Date.parse(from);
  const endMs = isLocalDate(to) ? startOfLocalDay(to, zone) : Date.parse(to);
  if (!(endMs > startMs))
    throw refuse(
      "to",
      "empty-range",
      "The end must be later than the start; it is not part of it.",
    );
  if (endMs - startMs > mostYears * 366 * DAY_MS)
    throw refuse("to", "range-too-long", `A range may be ${mostYears} years long at most.`);
  const dates = { from: localDateOf(startMs, zone), to: localDateOf(endMs, zone) };
  const whole =
    startOfLocalDay(dates.from, zone) === startMs && startOfLocalDay(dates.to, zone) === endMs;
  return { startMs, endMs, dates: whole ? dates : null };
}

/** Energy is stored by the quarter-hour: a range that cuts one has no exact answer. */
export function requireQuarterHours(range: Interval): void {
  const cut = (ms: number) => ms % INTERVAL_MS !== 0;
  if (cut(range.startMs))
    throw refuse("from", "not-a-quarter-hour", "Energy starts on a quarter-hour, such as 10:15.");
  if (cut(range.endMs))
    throw refuse("to", "not-a-quarter-hour", "Energy ends on a quarter-hour, such as 10:15.");
}

/** The part of the range that readings could cover by now; what is yet to come is not expected. */
export function expectedSeconds(range: Interval, nowMs: number): number {
  return Math.max(0, Math.min(range.endMs, nowMs) - range.startMs) / 1000;
}
