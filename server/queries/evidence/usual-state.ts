import type { InstallationFields, SizedBudget } from "@shared/contracts/evidence";
import { flowAtVelocityM3PerHour, velocityMPerS } from "@shared/domain/pipes/bore";
import type { UsualState } from "@shared/domain/uncertainty/budget-from-evidence";
import type { Loop } from "@server/models/loop";
import type { MeteringPoint } from "@server/models/metering-point";

/** Middle of what such loops are designed for, K, and a good water speed, m/s: common practice. */
const ASSUMED_DELTA_T_K = { chilled: 6.5, hot: 15, changeover: 6.5 } as const;
const ASSUMED_VELOCITY_M_PER_S = 1;

export interface BudgetState {
  readonly at: SizedBudget["at"];
  readonly flowM3PerHour: number | null;
  /** Null where no temperature of the loop is known. */
  readonly usual: UsualState | null;
}

/**
 * The state a budget is shown at before there are readings: as the meter shows it or as the loop is
 * designed, and a named assumption where neither is known.
 */
export function budgetStateOf(
  loop: Pick<Loop, "service" | "designFlowM3PerHour" | "designDeltaTK">,
  meterSide: MeteringPoint["meterSide"],
  fields: Pick<InstallationFields, "shownFlowLPerS" | "soundSpeed"> | null,
  boreMm: number | null,
): BudgetState {
  const shown = fields?.shownFlowLPerS ? Math.abs(fields.shownFlowLPerS) * 3.6 : null;
  const known = shown ?? loop.designFlowM3PerHour;
  const flow =
    known ?? (boreMm === null ? null : flowAtVelocityM3PerHour(ASSUMED_VELOCITY_M_PER_S, boreMm));
  const velocity = known === null || boreMm === null ? null : velocityMPerS(known, boreMm);
  const deltaTK = loop.designDeltaTK ?? ASSUMED_DELTA_T_K[loop.service];
  const meterC = fields?.soundSpeed?.fluidC ?? null;
  const supplyIsWarmer = loop.service === "hot";
  const towardsReturn = supplyIsWarmer ? -deltaTK : deltaTK;
  return {
    at: {
      deltaTK,
      deltaTFrom: loop.designDeltaTK === null ? "assumed" : "design",
      velocityMPerS: velocity ?? ASSUMED_VELOCITY_M_PER_S,
      velocityFrom: velocity === null ? "assumed" : shown === null ? "design" : "shown",
    },
    flowM3PerHour: flow,
    usual:
      meterC === null
        ? null
        : {
            supplyC: meterSide === "supply" ? meterC : meterC - towardsReturn,
            returnC: meterSide === "return" ? meterC : meterC + towardsReturn,
            velocityMPerS: velocity,
          },
  };
}
