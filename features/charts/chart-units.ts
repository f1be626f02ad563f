import type { Format } from "@features/i18n";

import type { ChartUnits } from "./chart-series";

/** The units of the account, as a chart needs them. */
export function chartUnits(format: Format): ChartUnits {
  return {
    temperature: format.unit("temperature"),
    temperatureDifference: format.unit("temperatureDifference"),
    flow: format.unit("flow"),
    heatingPower: format.unit("heatingPower"),
    coolingPower: format.unit("coolingPower"),
    heatingEnergy: format.unit("heatingEnergy"),
    coolingEnergy: format.unit("coolingEnergy"),
  };
}
