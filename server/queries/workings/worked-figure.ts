import type { WorkingsFigure } from "@shared/contracts/workings";
import { deltaTMeans, waterSeconds, type EnergyTotals } from "@shared/domain/energy/totals";
import type { UncertainFigure } from "@shared/domain/uncertainty/figures";
import { rounded } from "@server/presenters/present-energy";
import type { RegisterName } from "@server/queries/energy/loads";

/** The figure as screens show it, rounded as its summary is. */
export function valueOf(
  figure: WorkingsFigure,
  register: RegisterName,
  totals: EnergyTotals,
  rows: { readonly measured: number; readonly expected: number | null },
): number | null {
  const { coveredS, meterOnlyS } = totals;
  if (coveredS === 0) return null;
  switch (figure) {
    case "energy":
      return rounded(totals[register].energyKwh, 6);
    case "volume":
      return waterSeconds(totals) > 0 ? rounded(totals.volumeM3, 6) : null;
    case "deltaT": {
      const { flowWeightedK } = deltaTMeans(totals[register], meterOnlyS);
      return flowWeightedK === null ? null : rounded(flowWeightedK, 6);
    }
    case "power":
    case "nightBase":
      return rounded(totals[register].energyKwh / (coveredS / 3600), 4);
    case "completeness":
      return rows.expected
        ? rounded(Math.min(100, (100 * rows.measured) / rows.expected), 6)
        : null;
  }
}

export const UNITS = {
  energy: "kWh",
  volume: "m³",
  deltaT: "K",
  power: "kW",
  nightBase: "kW",
  completeness: "%",
} as const satisfies Record<WorkingsFigure, string>;

/** What the uncertainty of a figure is of; null for rows, which are counted. */
export function uncertainFigureOf(figure: WorkingsFigure): UncertainFigure | null {
  if (figure === "completeness") return null;
  return figure === "nightBase" ? "power" : figure;
}
