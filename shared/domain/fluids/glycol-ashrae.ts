import ashrae from "../../data/glycol_ashrae2001_fit_coefficients.json";
import type { GlycolCorrelation } from "./glycol-correlation";

export type GlycolKind = "ethyleneGlycol" | "propyleneGlycol";

interface AshraeGlycol extends GlycolCorrelation {
  /** Natural logarithm of the freezing point in K, by powers of the volume fraction − xbase. */
  readonly ln_T_freeze: readonly number[];
  /** Volume fraction by powers of the mass fraction − xbase. */
  readonly mass_to_volume_fraction: readonly number[];
}

/**
 * Ethylene and propylene glycol by VOLUME fraction, 0.10 to 0.60: fits of the tables of the 2001
 * ASHRAE Handbook – Fundamentals as carried by SecCool 1.33 (Skovrup, IPU, 2013), from the CoolProp
 * data set (fluids AEG and APG, MIT licence). The tables run from −35 to 100 °C above the freezing
 * curve; the fits keep density within 0.026 %, heat capacity within 0.016 % and viscosity within 10 %
 * of them (mean 1.2 %).
 */
export const ASHRAE_GLYCOL: Readonly<Record<GlycolKind, AshraeGlycol>> = {
  ethyleneGlycol: ashrae.AEG,
  propyleneGlycol: ashrae.APG,
};

export const LOWEST_GLYCOL_C = -35;
export const HIGHEST_GLYCOL_C = 100;
/** Below, the tables say nothing: properties are interpolated towards water. */
export const LOWEST_TABLE_VOLUME_PERCENT = 10;
export const HIGHEST_VOLUME_PERCENT = 60;
