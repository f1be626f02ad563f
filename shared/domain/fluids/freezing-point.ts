import { ASHRAE_GLYCOL, type GlycolKind, HIGHEST_VOLUME_PERCENT } from "./glycol-ashrae";
import { polynomial } from "./glycol-correlation";

/**
 * Temperature in °C at which a mixture starts to freeze, from 0 to 60 % by volume; null outside.
 *
 * Fit of the ASHRAE tables, within 0.35 K of them. It misses water's 0 °C by up to 0.08 K; below 10 %
 * that miss is taken out in proportion. Example: 27.7 % ethylene glycol → −13.99 °C (table −14.1).
 */
export function freezingPointC(kind: GlycolKind, volumePercent: number): number | null {
  if (!(volumePercent >= 0 && volumePercent <= HIGHEST_VOLUME_PERCENT)) return null;
  const { xbase, ln_T_freeze: fit } = ASHRAE_GLYCOL[kind];
  const fitC = (fraction: number) => Math.exp(polynomial(fit, fraction - xbase)) - 273.15;
  const fraction = volumePercent / 100;
  return fitC(fraction) - fitC(0) * Math.max(0, 1 - fraction / 0.1);
}
