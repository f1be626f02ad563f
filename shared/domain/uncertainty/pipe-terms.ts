import { TURBULENT_REYNOLDS } from "../pipes/reynolds-number";
import type { BoreFromEvidence } from "./bore-from-evidence";
import type { BudgetTerm } from "./budget";
import { budgetTerm, halfWidth, originOf, standard } from "./budget-term";
import {
  profileFromStraightRun,
  UNKNOWN_RUN_HALF_WIDTH_PERCENT,
} from "./profile-from-straight-run";
import type { StraightRunEvidence } from "./point-evidence";

/** Where not even nominal dimensions are known: ±5 % of flow, from memory of what surveys find. */
const UNKNOWN_BORE_PERCENT = 5;

/** u(ID) in mm, which counts twice in flow. Example: 0.227010 of 102.965 mm → 0.440945 % of flow. */
export function boreTerm(bore: BoreFromEvidence | null): BudgetTerm {
  return bore === null
    ? budgetTerm(
        "bore",
        halfWidth(UNKNOWN_BORE_PERCENT, "%"),
        originOf("default", "boreUnknown", { halfWidthPercent: UNKNOWN_BORE_PERCENT }),
      )
    : budgetTerm("bore", standard(bore.uncertaintyMm, "mm"), bore.origin);
}

/** Added below 10 000 and below 4 000: common practice without a source. */
const LOW_REYNOLDS_PERCENT = 2;
const TRANSITION_REYNOLDS = 4000;
const TRANSITION_PERCENT = 8;

/**
 * Velocity profile, ±% of flow: by fitting and distance in bores, ±5 % where nobody noted them, and
 * wider where the usual flow is not fully turbulent. Example: bend at 8.935 D → ±2.0 % → 1.154701 %.
 */
export function profileTerm(
  run: StraightRunEvidence | null,
  bore: BoreFromEvidence | null,
  reynolds: number | null,
): BudgetTerm {
  const profile = run && bore && profileFromStraightRun(run, bore.boreMm);
  const added = addedForReynolds(reynolds);
  const width = (profile?.halfWidthPercent ?? UNKNOWN_RUN_HALF_WIDTH_PERCENT) + added;
  if (added > 0 && reynolds !== null) {
    return budgetTerm(
      "profile",
      halfWidth(width, "%"),
      originOf(profile ? "evidence" : "default", "profileLowReynolds", {
        reynolds,
        addedPercent: added,
      }),
    );
  }
  if (!run || !profile) {
    return budgetTerm(
      "profile",
      halfWidth(width, "%"),
      originOf("default", "profileUnknownRun", { halfWidthPercent: width }),
    );
  }
  const short = profile.upstreamShort || profile.downstreamShort;
  return budgetTerm(
    "profile",
    halfWidth(width, "%"),
    originOf("evidence", short ? "profileShortRun" : "profileFromRun", {
      upstreamBores: profile.upstreamBores,
      downstreamBores: profile.downstreamBores,
      advisedBores: profile.advisedUpstreamBores,
      fitting: run.nearestFitting,
    }),
  );
}

function addedForReynolds(reynolds: number | null): number {
  if (reynolds === null || reynolds <= 0 || reynolds > TURBULENT_REYNOLDS) return 0;
  return reynolds < TRANSITION_REYNOLDS ? TRANSITION_PERCENT : LOW_REYNOLDS_PERCENT;
}

const UNTRIED_REMOUNT_PERCENT = 1;

/** Spread of two mountings, taken as standard; 1 % where nobody mounted twice (common practice). */
export function remountTerm(remountPercent: number | null): BudgetTerm {
  const percent = remountPercent ?? UNTRIED_REMOUNT_PERCENT;
  return budgetTerm(
    "remount",
    standard(percent, "%"),
    remountPercent === null
      ? originOf("default", "remountNotTried", { percent })
      : originOf("evidence", "remountMeasured", { percent }),
  );
}
