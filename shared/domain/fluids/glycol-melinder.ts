import melinder from "../../data/glycol_melinder2010_coefficients.json";
import type { GlycolKind } from "./glycol-ashrae";
import type { GlycolCorrelation } from "./glycol-correlation";

/**
 * Ethylene and propylene glycol by MASS fraction, 0 to 0.60: A. Melinder, Properties of Secondary
 * Working Fluids for Indirect Systems, IIR/IIF, 2010, as tabulated in the CoolProp data set (fluids
 * MEG and MPG, MIT licence). Never used for energy: it is the second opinion whose distance from the
 * ASHRAE tables says how well glycol is known.
 */
export const MELINDER_GLYCOL: Readonly<Record<GlycolKind, GlycolCorrelation>> = {
  ethyleneGlycol: melinder.MEG,
  propyleneGlycol: melinder.MPG,
};

/** The tables behind it that are public end here; above, it is extrapolated. */
export const HIGHEST_MELINDER_TABLE_C = 40;
