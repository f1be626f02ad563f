import type { MeterComparisonResult } from "@shared/contracts/meter-comparisons";
import type { Quantity } from "@shared/domain/units/display-units";
import type { MarkKind } from "@features/ui";

/** How serious each verdict is: agreement is quiet, disagreement stops the use of both. */
export const verdictMarks = {
  agree: "fine",
  disagree: "wrong",
  inconclusive: "look",
} as const satisfies Record<MeterComparisonResult["verdict"], MarkKind>;

/** Cooling is shown in its own unit where a point says that it is cooling; else in heat's. */
export function energyQuantityOf({
  first,
  second,
}: Pick<MeterComparisonResult, "first" | "second">): Quantity {
  const register = first.point?.register ?? second.point?.register;
  return register === "cooling" ? "coolingEnergy" : "heatingEnergy";
}

/** Expanded uncertainty of a difference of two independent figures; null where one is unknown. */
export function jointExpanded(first: number | null, second: number | null): number | null {
  return first === null || second === null ? null : Math.hypot(first, second);
}
