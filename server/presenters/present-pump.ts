import type { z } from "zod";
import type { getLoopPump } from "@shared/contracts/shape";
import type { LoopPump } from "@server/models/loop-pump";
import type { Site } from "@server/models/site";
import type { Actor } from "@server/policies/actor";
import { can } from "@server/policies/can";

export function presentPump(
  pump: LoopPump | null,
  site: Site,
  actor: Actor,
): z.input<(typeof getLoopPump)["answer"]> {
  return {
    pump: pump && {
      controlledHead: pump.controlledHead,
      staticHeadM: pump.staticHeadM,
      designHeadM: pump.designHeadM,
      designFlowM3PerHour: pump.designFlowM3PerHour,
      efficiency: pump.efficiency,
      minimumFlowM3PerHour: pump.minimumFlowM3PerHour,
      pricePerKwh: pump.pricePerKwh === null ? null : plainPrice(pump.pricePerKwh),
    },
    currency: site.currency,
    can: { edit: can(actor).editSites },
  };
}

/** A DECIMAL without the zeros that only fill its places: "0.187000" is "0.187". */
export function plainPrice(decimal: string): string {
  return decimal.includes(".") ? decimal.replace(/0+$/, "").replace(/\.$/, "") : decimal;
}
