import type { EnergyPlusMinus } from "@shared/contracts/plus-minus";

import type { TimeColumn } from "./time-columns";

/** Energy of one local day as the page knows it; null where nothing is covered. */
export interface ChartDay {
  readonly date: string;
  readonly heatingKwh: number | null;
  readonly coolingKwh: number | null;
  /** Of the day's energies; left out where nobody works it out. */
  readonly plusMinus?: EnergyPlusMinus | undefined;
}

/** The ± of a column that is one day; of longer ones the page's own figures tell. */
export function columnExpandedKwh(
  column: TimeColumn,
  days: readonly ChartDay[],
  register: "heating" | "cooling",
): number | null {
  if (column.unit !== "day") return null;
  return days.find(({ date }) => date === column.date)?.plusMinus?.[register]?.expanded ?? null;
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
