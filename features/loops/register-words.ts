import type { LoopService } from "@shared/contracts/places";
import type { Service } from "@features/ui";

export type RegisterName = "heating" | "cooling";

/** The tag's service: chilled water takes heat in, hot water gives it out. */
export function tagService(service: LoopService): Service {
  return ({ chilled: "cooling", hot: "heating", changeover: "changeover" } as const)[service];
}

/** The registers a loop's page leads with; a changeover loop has both and never their difference. */
export function registersOf(service: LoopService): readonly RegisterName[] {
  if (service === "changeover") return ["heating", "cooling"];
  return [service === "hot" ? "heating" : "cooling"];
}

export const energyQuantity = { heating: "heatingEnergy", cooling: "coolingEnergy" } as const;
export const powerQuantity = { heating: "heatingPower", cooling: "coolingPower" } as const;
