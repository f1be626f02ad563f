import type { ProbeClass } from "./point-evidence";

/**
 * Error limits of industrial platinum thermometers in K at t °C: AA ±(0.1 + 0.0017·|t|),
 * A ±(0.15 + 0.002·|t|), B ±(0.3 + 0.005·|t|). Source: IEC 60751, from a secondary copy.
 *
 * The limits bound one probe. They say nothing about a pair, which needs a check of its own. The
 * ranges of the standard (−30…300 °C at the least for class A wire-wound, narrower for films) contain
 * what water loops reach. Example: class B at 12.8 °C → ±0.364 K.
 */
export function classLimitK(probeClass: ProbeClass, temperatureC: number): number {
  const { fixedK, perKelvin } = LIMITS[probeClass];
  return fixedK + perKelvin * Math.abs(temperatureC);
}

const LIMITS: Readonly<Record<ProbeClass, { fixedK: number; perKelvin: number }>> = {
  AA: { fixedK: 0.1, perKelvin: 0.0017 },
  A: { fixedK: 0.15, perKelvin: 0.002 },
  B: { fixedK: 0.3, perKelvin: 0.005 },
};
