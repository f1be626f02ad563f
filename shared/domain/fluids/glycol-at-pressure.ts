import type { FluidAtPressure } from "./fluid-at-pressure";
import { freezingPointC } from "./freezing-point";
import {
  ASHRAE_GLYCOL,
  HIGHEST_GLYCOL_C,
  LOWEST_GLYCOL_C,
  LOWEST_TABLE_VOLUME_PERCENT,
  type GlycolKind,
} from "./glycol-ashrae";
import { mixtureAt, type Mixture } from "./glycol-correlation";
import { saturationTemperatureC } from "./saturation";
import { waterAtPressure } from "./water-at-pressure";

/** Whether properties lie between water and the most dilute mixture of the tables. */
export function isInterpolated(volumePercent: number): boolean {
  return volumePercent > 0 && volumePercent < LOWEST_TABLE_VOLUME_PERCENT;
}

/**
 * A glycol mixture at one pressure, as quick as water: the ASHRAE fits folded at its concentration.
 *
 * From 10 to 60 % by volume: −35 to 100 °C, above the freezing point. Between 0 and 10 %: linear in
 * volume percent between water (IAPWS-IF97) and the 10 % mixture at the same temperature, viscosity in
 * its logarithm, from 0 °C because water ends there; what that costs is in `fluid-heat-uncertainty`.
 * At 0 %: water. The tables have no pressure; a mixture is refused from where water would boil, which
 * is a little early. Anything else is a RangeError: `fluidForEnergy` refuses it with a reason.
 *
 * Example: 30 % by mass propylene glycol (29.39 % by volume) at 12/6 °C with the meter in the 12 °C
 * pipe carries 5.88 % less heat for each m³ and K than water at 1.6 MPa.
 */
export function glycolAtPressure(
  kind: GlycolKind,
  volumePercent: number,
  pressureMPa: number,
): FluidAtPressure {
  const freezesAtC = freezingPointC(kind, volumePercent);
  if (freezesAtC === null) {
    throw new RangeError(
      `Glycol is computed from 0 to 60 % by volume, not at ${volumePercent} %. Check the loop's fluid.`,
    );
  }
  const water = waterAtPressure(pressureMPa);
  if (volumePercent === 0) return water;
  const interpolated = isInterpolated(volumePercent);
  const tablePercent = Math.max(volumePercent, LOWEST_TABLE_VOLUME_PERCENT);
  const mixture = mixtureAt(ASHRAE_GLYCOL[kind], tablePercent / 100);
  const boilsAtC = pressureMPa >= 1 ? Infinity : saturationTemperatureC(pressureMPa);
  return {
    kind,
    pressureMPa,
    lowestC: interpolated ? water.lowestC : Math.max(LOWEST_GLYCOL_C, freezesAtC),
    highestC: Math.min(HIGHEST_GLYCOL_C, boilsAtC),
    ...(interpolated
      ? between(water, mixture, volumePercent / LOWEST_TABLE_VOLUME_PERCENT)
      : mixture),
  };
}

/** Properties the `share` of the way from water to a mixture. */
function between(water: FluidAtPressure, mixture: Mixture, share: number): Mixture {
  const rest = 1 - share;
  return {
    density: (t) => rest * water.density(t) + share * mixture.density(t),
    enthalpy: (t) => rest * water.enthalpy(t) + share * mixture.enthalpy(t),
    heatCapacity: (t) => rest * water.heatCapacity(t) + share * mixture.heatCapacity(t),
    viscosityPaS: (t) => water.viscosityPaS(t) ** rest * mixture.viscosityPaS(t) ** share,
  };
}
