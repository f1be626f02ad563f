import { lengthInBores, straightRunBefore, type UpstreamFitting } from "../pipes/straight-run";
import { ADVISED_BORES } from "../pipes/straight-run";
import type { Fitting, StraightRunEvidence } from "./point-evidence";

/**
 * Half-width of the error a disturbed velocity profile leaves in a clamp-on meter's flow, % of flow.
 *
 * Behind one 90° bend the correction is at most 1.02 from 8 D on, and nearer the errors reach 10.8 %,
 * always reading low (Synowiec et al., abstract). So: ±2 % from 0.8 of the advised run on, rising in
 * a straight line to ±10.8 % at 0.4 of it, no more nearer; ±1 % where nothing disturbs or from twice
 * the advised run. The advice is 10 D, 20 D behind fittings that swirl or jet, and 5 D after the
 * meter; each bore missing after it adds 0.4 %. Scaling the bend's figures by the advice, the ±1 %
 * and the part after the meter are common practice without a source. The error's one-sidedness is
 * not used: no correction is made, so the rectangle is symmetric.
 *
 * Example: 8.935 D after a bend and 5.924 D before the next fitting → ±2.0 %.
 */
export interface ProfileError {
  readonly halfWidthPercent: number;
  readonly upstreamBores: number;
  readonly downstreamBores: number;
  /** 0 where no fitting disturbs. */
  readonly advisedUpstreamBores: number;
  readonly upstreamShort: boolean;
  readonly downstreamShort: boolean;
}

/** Where nobody noted the straight run: halfway between a good place and the worst one. */
export const UNKNOWN_RUN_HALF_WIDTH_PERCENT = 5;

const UNDISTURBED_PERCENT = 1;
const SETTLED_PERCENT = 2;
const NEAR_PERCENT = 10.8;
const SETTLED_SHARE = 0.8;
const NEAR_SHARE = 0.4;
const PER_MISSING_BORE_PERCENT = 0.4;

const UPSTREAM: Readonly<Record<Exclude<Fitting, "none">, UpstreamFitting>> = {
  bend: "bend",
  twoBendsInPlane: "bend",
  twoBendsOutOfPlane: "twoBendsOutOfPlane",
  tee: "tee",
  reducer: "reducer",
  valveOpen: "openValve",
  valveThrottled: "throttledValve",
  pump: "pump",
};

/** Null where the bore is not a usable size. */
export function profileFromStraightRun(
  run: StraightRunEvidence,
  boreMm: number,
): ProfileError | null {
  const upstreamBores = lengthInBores(run.upstreamM, boreMm);
  const downstreamBores = lengthInBores(run.downstreamM, boreMm);
  if (upstreamBores === null || downstreamBores === null) return null;
  const before =
    run.nearestFitting === "none"
      ? null
      : straightRunBefore(run.upstreamM, boreMm, UPSTREAM[run.nearestFitting]);
  const advisedUpstreamBores = before?.advisedBores ?? 0;
  const missingAfter = Math.max(0, ADVISED_BORES.after - downstreamBores);
  return {
    halfWidthPercent:
      widthBefore(upstreamBores, advisedUpstreamBores) + PER_MISSING_BORE_PERCENT * missingAfter,
    upstreamBores,
    downstreamBores,
    advisedUpstreamBores,
    upstreamShort: upstreamBores < advisedUpstreamBores,
    downstreamShort: missingAfter > 0,
  };
}

function widthBefore(bores: number, advised: number): number {
  if (bores >= 2 * advised) return UNDISTURBED_PERCENT;
  const settled = SETTLED_SHARE * advised;
  const near = NEAR_SHARE * advised;
  const missing = Math.min(1, Math.max(0, (settled - bores) / (settled - near)));
  return SETTLED_PERCENT + missing * (NEAR_PERCENT - SETTLED_PERCENT);
}
