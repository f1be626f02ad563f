import type { Workings, WorkingsFigure } from "@shared/contracts/workings";
import { heatCoefficient } from "@shared/domain/energy/heat-coefficient";
import { waterSeconds, type EnergyTotals } from "@shared/domain/energy/totals";
import type { EnergyPoint } from "@server/queries/energy/energy-point";
import type { RegisterName } from "@server/queries/energy/loads";
import { quotient } from "./figure-uncertainty";
import type { WaterMeans } from "./water-means";

interface ByHandInput {
  readonly figure: WorkingsFigure;
  readonly register: RegisterName;
  readonly totals: EnergyTotals;
  readonly means: WaterMeans;
  readonly value: number | null;
}

/**
 * A check with a pencil: V × k × ΔT, with k at the mean temperatures. It leaves out how flow and ΔT
 * move together within the range, so it comes near the sum of rows and does not equal it. Null where
 * there is nothing to multiply.
 */
export function byHand(energyPoint: EnergyPoint, input: ByHandInput): Workings["byHand"] {
  const factors = factorsOf(energyPoint, input);
  if (factors === null || input.value === null) return null;
  const result = factors.reduce((product, factor) => product * factor.value, 1);
  const unit = { energy: "kWh", volume: "m³" }[input.figure as string] ?? "kW";
  return {
    factors,
    result,
    unit,
    differencePercent: input.value === 0 ? null : 100 * (result / input.value - 1),
  };
}

type Factors = NonNullable<Workings["byHand"]>["factors"];

function factorsOf(energyPoint: EnergyPoint, input: ByHandInput): Factors | null {
  const { figure, register, totals } = input;
  const own = totals[register];
  switch (figure) {
    case "energy":
      return totals.meterOnlyS > 0
        ? meteredEnergy(input)
        : heatFactors(energyPoint, input, { value: own.volumeM3, unit: "m³", code: "volume" });
    case "power":
    case "nightBase": {
      const flow = quotient(own.volumeM3, waterSeconds(totals) / 3600);
      if (flow === null || totals.meterOnlyS > 0) return null;
      return heatFactors(energyPoint, input, { value: flow, unit: "m³/h", code: "flow" });
    }
    case "volume": {
      const hours = waterSeconds(totals) / 3600;
      const flow = quotient(totals.volumeM3, hours);
      if (flow === null) return null;
      return [
        { value: flow, unit: "m³/h", code: "flow" },
        { value: hours, unit: "h", code: "hours" },
      ];
    }
    case "deltaT":
    case "completeness":
      return null;
  }
}

/** Mean power × hours: a meter's own power needs no water. */
function meteredEnergy({ register, totals }: ByHandInput): Factors | null {
  const hours = totals.coveredS / 3600;
  const power = quotient(totals[register].energyKwh, hours);
  if (power === null) return null;
  return [
    { value: power, unit: "kW", code: "power" },
    { value: hours, unit: "h", code: "hours" },
  ];
}

function heatFactors(
  { settings, point }: EnergyPoint,
  { register, totals, means }: ByHandInput,
  first: Factors[number],
): Factors | null {
  const deltaT = quotient(totals[register].flowDeltaTM3K, totals[register].volumeM3);
  const { supplyC, returnC } = means;
  if (deltaT === null || supplyC === null || returnC === null || !settings.fluid.ok) return null;
  const k = heatCoefficient(settings.fluid.fluid, point.meterSide, supplyC, returnC);
  if (k === null) return null;
  return [
    first,
    { value: k.kwhPerM3K, unit: "kWh/(m³·K)", code: "heatCoefficient" },
    { value: deltaT, unit: "K", code: "deltaT" },
  ];
}
