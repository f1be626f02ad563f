import { useFormat } from "@features/i18n";

const HALF_YEAR_MS = 182 * 86_400_000;

/**
 * An instant near now as day and time, one further away as a date with its year, which a weekday and
 * a month alone would leave open.
 *
 * @param nowMs UTC ms
 */
export function useWhen(nowMs: number): (instant: string) => string {
  const format = useFormat();
  return (instant) => {
    const ms = Date.parse(instant);
    return Math.abs(ms - nowMs) > HALF_YEAR_MS ? format.date(ms, "full") : format.dateTime(ms);
  };
}
