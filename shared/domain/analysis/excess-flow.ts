import { heatCoefficient } from "../energy/heat-coefficient";
import type { MeterSide } from "../energy/power";
import type { FluidAtPressure } from "../fluids/fluid-at-pressure";
import { stepPowerKw, type LoadSteps } from "./load-steps";
import { pumpPowerKw, type PumpCurve } from "./pump-power";

/**
 * Water that was moved beyond what the load needed at the design temperature difference.
 *
 * For each step q_ideal = max(P ÷ (k·Δθ_d), q_min), never above q, in m³/h, with the heat
 * coefficient k of EN 1434-1 in kWh/(m³·K) taken at the measured supply and the *design*
 * return (supply + Δθ_d for cooling, − Δθ_d for heating), not at the return that was measured. Excess
 * is V ÷ V_ideal − 1.
 *
 * Means over a step hide what happens within it: flow and load that swing against each other inside
 * a quarter-hour are judged by their means. Where the design return lies outside the fluid's liquid
 * range the step is left out and counted.
 *
 * Example: 100 kW of cooling from 6 °C with 6 K of design difference and the meter on the return
 * needs 14.312 m³/h at 1.6 MPa; at 20 m³/h the excess is 39.7 %.
 */
export interface ExcessFlowOptions {
  readonly fluid: FluidAtPressure;
  readonly register: "heating" | "cooling";
  readonly meterSide: MeterSide;
  /** Above 0. */
  readonly designDeltaTK: number;
  /** Least flow the plant needs whatever the load, m³/h; null: none is known, and none is kept. */
  readonly minimumFlowM3PerHour: number | null;
  /** Null where the pump is not known. */
  readonly pump: PumpCurve | null;
}

export interface ExcessFlow {
  readonly volumeM3: number;
  readonly idealVolumeM3: number;
  /** V ÷ V_ideal − 1; null where no volume would have been needed. */
  readonly excessShare: number | null;
  /** Time the figures stand on, and covered time left out of them. */
  readonly seconds: number;
  readonly leftOutS: number;
  readonly pump: ExcessPumping | null;
}

export interface ExcessPumping {
  readonly energyKwh: number;
  readonly idealEnergyKwh: number;
  readonly excessKwh: number;
}

/** Flow that would have carried the power at the design difference, m³/h; null outside the fluid. */
export function flowAtDesignM3PerHour(
  powerKw: number,
  supplyC: number,
  { fluid, register, meterSide, designDeltaTK }: Omit<ExcessFlowOptions, "pump">,
): number | null {
  const returnC = register === "cooling" ? supplyC + designDeltaTK : supplyC - designDeltaTK;
  const k = heatCoefficient(fluid, meterSide, supplyC, returnC);
  return k && powerKw / (k.kwhPerM3K * designDeltaTK);
}

/** Sums over the steps with readings; null where there is none. */
export function excessFlow(steps: LoadSteps, options: ExcessFlowOptions): ExcessFlow | null {
  const { fluid, pump } = options;
  let volumeM3 = 0;
  let idealVolumeM3 = 0;
  let seconds = 0;
  let leftOutS = 0;
  let energyKwh = 0;
  let idealEnergyKwh = 0;
  for (let i = 0; i < steps.startMs.length; i++) {
    const coveredS = steps.coveredS[i]!;
    if (coveredS === 0) continue;
    const hours = coveredS / 3600;
    const supplyC = steps.supplyC[i]!;
    const needed = flowAtDesignM3PerHour(stepPowerKw(steps, i), supplyC, options);
    if (needed === null) {
      leftOutS += coveredS;
      continue;
    }
    const flow = steps.volumeM3[i]! / hours;
    const ideal = Math.min(flow, Math.max(needed, options.minimumFlowM3PerHour ?? 0));
    seconds += coveredS;
    volumeM3 += flow * hours;
    idealVolumeM3 += ideal * hours;
    if (pump) {
      const density = fluid.density(supplyC);
      energyKwh += pumpPowerKw(pump, flow, density) * hours;
      idealEnergyKwh += pumpPowerKw(pump, ideal, density) * hours;
    }
  }
  if (seconds === 0) return null;
  return {
    volumeM3,
    idealVolumeM3,
    excessShare: idealVolumeM3 > 0 ? volumeM3 / idealVolumeM3 - 1 : null,
    seconds,
    leftOutS,
    pump: pump && { energyKwh, idealEnergyKwh, excessKwh: energyKwh - idealEnergyKwh },
  };
}
