import type { FluidAtPressure } from "../fluids/fluid-at-pressure";
import type { BudgetTerm } from "./budget";
import { budgetTerm, originOf, standard } from "./budget-term";
import { daysFrom } from "./calendar-days";
import { standardFromHalfWidth } from "./distributions";

/** Of the density formula, a half-width, and of the enthalpy formula, standard. */
const DENSITY_FORMULA_PERCENT = 0.05;
const ENTHALPY_FORMULA_PERCENT = 0.05;
/** Standard uncertainty of the one temperature at which the density is taken. */
const METER_TEMPERATURE_K = 0.1;
/** Of water at 100 °C: the cautious side where no temperature is known. */
const GREATEST_EXPANSION_PER_K = 7.5e-4;
export const FLUID_TEST_DAYS = 365;
const OLD_TEST_FACTOR = 1.5;
const UNTESTED_FACTOR = 2;

/**
 * Relative change of density with temperature, 1/K, ≥ 0: −Δρ/(ρ·ΔT) over 0.02 K.
 * Example: water at 12.80 °C and 1.6 MPa → 1.2746e-4 per K.
 */
export function expansionPerK(fluid: FluidAtPressure, temperatureC: number): number {
  const drop = fluid.density(temperatureC - 0.01) - fluid.density(temperatureC + 0.01);
  return Math.abs(drop / 0.02 / fluid.density(temperatureC));
}

/**
 * What density, enthalpy and the mixture leave in heat, %.
 *
 * Density: ±0.05 % of the formula (rectangular) and 0.1 K of the temperature it is taken at; enthalpy
 * 0.05 %. A mixture adds `fluidHeatPercent` (standard, see fluid-heat-uncertainty), 1.5 times that
 * where its test is older than a year and twice where nobody tested it (common practice). Water adds
 * none. Example: water, meter at 12.80 °C and 1.6 MPa → density 0.0288956 %, enthalpy 0.05 %.
 */
export function fluidTerms(
  fluid: FluidAtPressure | null,
  meterC: number | null,
  fluidHeatPercent: number,
  testedOn: string | null,
  onDate: string,
): BudgetTerm[] {
  const known =
    fluid !== null && meterC !== null && meterC > fluid.lowestC && meterC < fluid.highestC;
  const expansion = known ? expansionPerK(fluid, meterC) : GREATEST_EXPANSION_PER_K;
  const density = Math.hypot(
    standardFromHalfWidth(DENSITY_FORMULA_PERCENT),
    100 * expansion * METER_TEMPERATURE_K,
  );
  const terms = [
    budgetTerm(
      "density",
      standard(density, "%"),
      originOf("default", "densityFormula", {
        formulaPercent: DENSITY_FORMULA_PERCENT,
        temperatureK: METER_TEMPERATURE_K,
        expansionPerK: expansion,
      }),
    ),
    budgetTerm(
      "enthalpy",
      standard(ENTHALPY_FORMULA_PERCENT, "%"),
      originOf("default", "enthalpyFormula", { percent: ENTHALPY_FORMULA_PERCENT }),
    ),
  ];
  return fluidHeatPercent > 0 ? [...terms, mixtureTerm(fluidHeatPercent, testedOn, onDate)] : terms;
}

function mixtureTerm(percent: number, testedOn: string | null, onDate: string): BudgetTerm {
  if (testedOn === null) {
    return budgetTerm(
      "fluid",
      standard(UNTESTED_FACTOR * percent, "%"),
      originOf("default", "fluidNotTested", { percent, factor: UNTESTED_FACTOR }),
    );
  }
  return daysFrom(testedOn, onDate) > FLUID_TEST_DAYS
    ? budgetTerm(
        "fluid",
        standard(OLD_TEST_FACTOR * percent, "%"),
        originOf("evidence", "fluidTestOld", { percent, factor: OLD_TEST_FACTOR, testedOn }),
      )
    : budgetTerm("fluid", standard(percent, "%"), originOf("evidence", "fluidSpread", { percent }));
}
