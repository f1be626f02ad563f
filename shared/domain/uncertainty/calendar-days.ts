import { DAY_MS } from "../time/interval";

/** Whole days from one calendar date to another, both YYYY-MM-DD; negative when it lies before. */
export function daysFrom(date: string, to: string): number {
  return Math.round((Date.parse(`${to}T00:00:00Z`) - Date.parse(`${date}T00:00:00Z`)) / DAY_MS);
}
