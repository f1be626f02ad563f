import type { Format } from "@features/i18n";

/** An instant with its year, in the site's zone: evidence is read years later. */
export function whenOf(format: Format): (instant: string) => string {
  return (instant) => {
    const ms = Date.parse(instant);
    return `${format.date(ms, "dayMonthYear")}, ${format.time(ms)}`;
  };
}
