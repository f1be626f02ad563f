import type { Workings } from "@shared/contracts/workings";
import { fluidFacts } from "@shared/domain/fluids/fluid-facts";
import { presentBasis } from "@server/presenters/present-energy";
import type { EnergyPoint } from "@server/queries/energy/energy-point";
import type { FigureUncertainty, WithoutUncertainty } from "./figure-uncertainty";

interface Found {
  readonly figure: Workings["figure"];
  readonly covered: boolean;
  readonly coverage: number | null;
  readonly uncertainty: FigureUncertainty | WithoutUncertainty | null;
  readonly installations: Workings["installations"];
}

/** What a reader must know before using the figure, as codes; the weightiest first. */
export function cautionsOf(energyPoint: EnergyPoint, found: Found): string[] {
  const { loop, settings, readings } = energyPoint;
  const { uncertainty, coverage, installations } = found;
  const isWorked = uncertainty !== null && typeof uncertainty !== "string";
  const parts = isWorked ? uncertainty.parts : [];
  const ofWater = parts.length === 0 || parts.some(({ measuredBy }) => measuredBy === "water");
  const blocks = (what: "use" | "billing") =>
    installations.some(({ verdicts }) =>
      verdicts.some(({ adds }) => adds?.kind === "block" && adds.blocks === what),
    );
  const cautions: readonly (readonly [code: string, holds: boolean])[] = [
    ["energyBlocked", presentBasis(energyPoint).blockedBy !== null],
    ["nothingCovered", !found.covered],
    ["stopVerdict", blocks("use")],
    ["billingHeldUp", blocks("billing")],
    ["indicativeOnly", parts.some(({ part }) => part.installation?.indicativeOnly === true)],
    ["noUncertaintyForMeter", uncertainty === "noUncertaintyForMeter"],
    ["noUncertaintyWithoutFlow", uncertainty === "noUncertaintyWithoutFlow"],
    ["countedNoUncertainty", found.figure === "completeness"],
    ["coverageBelow95", coverage !== null && coverage < 0.95],
    ["coverageBelow99", coverage !== null && coverage >= 0.95 && coverage < 0.99],
    ["defaultsOnly", isWorked && uncertainty.basis === "defaults"],
    ["partlyDefaults", isWorked && uncertainty.basis === "partlyDefaults"],
    ["boreUnknown", parts.some(isWaterWithoutBore)],
    ["meansOnly", readings.meansOnly],
    ["glycolInterpolated", fluidFacts(loop.fluid, loop.gaugePressureMPa)?.interpolated === true],
    // A meter's own power does not ask for the loop's pressure.
    ["pressureAssumed", ofWater && settings.pressure.assumed],
    ["recalculating", readings.recalculating],
  ];
  return cautions.flatMap(([code, holds]) => (holds ? [code] : []));
}

const isWaterWithoutBore = ({ measuredBy, budget }: FigureUncertainty["parts"][number]) =>
  measuredBy === "water" && budget.boreMm === null;
