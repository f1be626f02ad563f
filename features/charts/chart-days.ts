import type { TimeColumn } from "./time-columns";

/** Energy of one local day as the page knows it; null where nothing is covered. */
export interface ChartDay {
  readonly date: string;
  readonly heatingKwh: number | null;
  readonly coolingKwh: number | null;
}

/** Energy of the days a column holds; null where none of them covers anything. */
export function columnEnergy(
  column: TimeColumn,
  endDate: string,
  days: readonly ChartDay[],
  register: "heating" | "cooling",
): number | null {
  let sum: number | null = null;
  for (const day of days) {
    if (day.date < column.date || day.date >= endDate) continue;
    const kwh = register === "heating" ? day.heatingKwh : day.coolingKwh;
    if (kwh !== null) sum = (sum ?? 0) + kwh;
  }
  return sum;
}
