import { soundSpeedMPerS } from "../fluids/sound-speed";
import { TURBULENT_REYNOLDS } from "../pipes/reynolds-number";
import { ADVISED_BORES } from "../pipes/straight-run";
import { boreFromEvidence } from "./bore-from-evidence";
import type { ConditionsInput } from "./conditions";
import type { SoundSpeedEvidence } from "./point-evidence";
import { profileFromStraightRun } from "./profile-from-straight-run";
import { blocks, type ConditionVerdict, fine, widens } from "./verdict";
import { zeroLeft } from "./zero-term";

export const LEAST_VELOCITY_M_PER_S = 0.3;
export const SOUND_SPEED_LIMIT_PERCENT = 1;
const ADVISED_WALL_READINGS = 4;
const WALL_SPREAD_LIMIT_PERCENT = 10;
const ENTERED_BORE_LIMIT_PERCENT = 1;

/** Speed, Reynolds number, sound speed, straight run, zero and bore. */
export function flowConditions(input: ConditionsInput): ConditionVerdict[] {
  const { evidence, fluid } = input;
  return [
    ...velocityVerdict(input.state.velocityMPerS),
    ...reynoldsVerdict(input.state.reynolds),
    ...(evidence?.soundSpeed
      ? soundSpeedVerdict(evidence.soundSpeed, soundSpeedMPerS(fluid, evidence.soundSpeed.fluidC))
      : []),
    ...straightRunVerdicts(input),
    zeroVerdict(input),
    ...boreVerdicts(input),
  ];
}

/** At least 0.3 m/s: below, what the zero leaves grows in proportion. */
function velocityVerdict(velocityMPerS: number | null): ConditionVerdict[] {
  if (velocityMPerS === null) return [];
  const values = { velocityMPerS, leastMPerS: LEAST_VELOCITY_M_PER_S };
  return Math.abs(velocityMPerS) >= LEAST_VELOCITY_M_PER_S
    ? [fine("velocity", "velocityFine", values)]
    : [widens("velocity", "velocityLow", values, "zero")];
}

/** Above 10 000: below, the profile is not the turbulent one the meter assumes. */
function reynoldsVerdict(reynolds: number | null): ConditionVerdict[] {
  if (reynolds === null) return [];
  const values = { reynolds, least: TURBULENT_REYNOLDS };
  return reynolds > TURBULENT_REYNOLDS
    ? [fine("reynolds", "reynoldsFine", values)]
    : [widens("reynolds", "reynoldsLow", values, "profile")];
}

/**
 * The sound speed a meter displays against what the fluid should have, within ±1 %: a miss means a
 * wrong fluid, bore or spacing, or air. None where no formula speaks for the fluid.
 * Example: water at 11.2 °C, 1451.986 m/s: 1449 is −0.2056 %, plausible; 1389 is −4.3379 %, not.
 */
export function soundSpeedVerdict(
  { displayedMPerS }: SoundSpeedEvidence,
  expectedMPerS: number | null,
): ConditionVerdict[] {
  if (expectedMPerS === null) return [];
  const deviationPercent = 100 * (displayedMPerS / expectedMPerS - 1);
  const values = {
    displayedMPerS,
    expectedMPerS,
    deviationPercent,
    limitPercent: SOUND_SPEED_LIMIT_PERCENT,
  };
  return Math.abs(deviationPercent) <= SOUND_SPEED_LIMIT_PERCENT
    ? [fine("soundSpeed", "soundSpeedPlausible", values)]
    : [blocks("soundSpeed", "soundSpeedImplausible", values, "use")];
}

/** A short run is a warning that adds uncertainty, never a block. */
function straightRunVerdicts({ evidence, budget }: ConditionsInput): ConditionVerdict[] {
  const run = evidence?.straightRun ?? null;
  const profile = run && budget.boreMm !== null && profileFromStraightRun(run, budget.boreMm);
  if (!profile) return [widens("straightRun", "straightRunUnknown", {}, "profile")];
  const { upstreamBores, downstreamBores, advisedUpstreamBores: advisedUpstream } = profile;
  const advisedDownstream = ADVISED_BORES.after;
  const found: ConditionVerdict[] = [];
  if (profile.upstreamShort) {
    const values = { upstreamBores, advisedUpstream };
    found.push(widens("straightRun", "straightRunUpstreamShort", values, "profile"));
  }
  if (profile.downstreamShort) {
    const values = { downstreamBores, advisedDownstream };
    found.push(widens("straightRun", "straightRunDownstreamShort", values, "profile"));
  }
  const all = { upstreamBores, downstreamBores, advisedUpstream, advisedDownstream };
  return found.length > 0 ? found : [fine("straightRun", "straightRunFine", all)];
}

function zeroVerdict({ evidence }: ConditionsInput): ConditionVerdict {
  const zero = evidence?.zero ?? null;
  const { code, widthMPerS: halfWidthMPerS } = zeroLeft(zero);
  if (code === "zeroSet") return fine("zero", "zeroProven", { halfWidthMPerS });
  return code === "zeroReadingLeft"
    ? widens("zero", code, { readingMPerS: zero?.readingMPerS ?? 0 }, "zero")
    : widens("zero", "zeroUnproven", { halfWidthMPerS }, "zero");
}

/** A measured bore of four wall readings or more, none far from the rest, and the one in the meter. */
function boreVerdicts({
  evidence,
  enteredBoreMm,
  enteredBoreCorrected,
}: ConditionsInput): ConditionVerdict[] {
  const measured = boreFromEvidence(evidence?.pipe ?? null, null);
  if (measured === null) return [widens("bore", "boreNotMeasured", {}, "bore")];
  const { boreMm } = measured;
  const walls = evidence?.pipe?.wallReadingsMm ?? [];
  const wallReadings = walls.length;
  const found: ConditionVerdict[] = [];
  if (wallReadings < ADVISED_WALL_READINGS) {
    const values = { boreMm, wallReadings, advised: ADVISED_WALL_READINGS };
    found.push(widens("bore", "boreFewWallReadings", values, "bore"));
  }
  const spreadPercent = (100 * (Math.max(...walls) - Math.min(...walls))) / measured.wallMeanMm;
  if (spreadPercent > WALL_SPREAD_LIMIT_PERCENT) {
    const values = { spreadPercent, limitPercent: WALL_SPREAD_LIMIT_PERCENT };
    found.push(widens("bore", "boreWallSpread", values, "bore"));
  }
  if (enteredBoreMm !== null && !enteredBoreCorrected) {
    const flowPercent = 100 * ((boreMm / enteredBoreMm) ** 2 - 1);
    if (Math.abs(flowPercent) > ENTERED_BORE_LIMIT_PERCENT) {
      const values = { enteredBoreMm, boreMm, flowPercent };
      found.push(blocks("bore", "boreEnteredDiffers", values, "billing"));
    }
  }
  const values = { boreMm, uncertaintyMm: measured.uncertaintyMm, wallReadings };
  return found.length > 0 ? found : [fine("bore", "boreMeasured", values)];
}
