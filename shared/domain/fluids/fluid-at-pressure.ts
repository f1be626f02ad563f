/** What may fill a loop. */
export type FluidKind = "water" | "ethyleneGlycol" | "propyleneGlycol";

/**
 * One fluid at one fixed pressure: all that energy and flow need to know of it.
 *
 * Every property expects a temperature within `lowestC` and `highestC`; outside, the fluid is frozen,
 * boils or is not known, and what comes back means nothing. Ask `temperatureProblem` for the reason.
 */
export interface FluidAtPressure {
  readonly kind: FluidKind;
  /** Absolute. */
  readonly pressureMPa: number;
  /** Lowest and highest temperature at which this fluid is liquid and computed, °C. */
  readonly lowestC: number;
  readonly highestC: number;
  /** kg/m³. */
  density(temperatureC: number): number;
  /** kJ/kg. Only differences within one fluid mean anything: each has a zero of its own. */
  enthalpy(temperatureC: number): number;
  /** Isobaric, kJ/(kg·K). */
  heatCapacity(temperatureC: number): number;
  /** Dynamic, Pa·s. */
  viscosityPaS(temperatureC: number): number;
}
