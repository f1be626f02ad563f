import type { LoopService } from "../../energy/power";
import type { FlowUnit, TemperatureUnit } from "../../log-files/recipe";
import type { GapRule } from "../covered-steps";
import type { ReadingSegment } from "../reading-columns";
import { clockHint, type ClockHintFinding } from "./clock-hints";
import { clockOff, type ClockFinding, type ClockNote } from "./clock-notes";
import { farDates, type FarDatesFinding } from "./far-dates";
import { gapsFinding, type GapsFinding } from "./gaps";
import { hampelSpikes, type SpikeFinding } from "./hampel-spikes";
import { noFlowNoise, type NoFlowNoiseFinding } from "./no-flow-noise";
import { reversedFlow, type NegativeFlowFinding } from "./reversed-flow";
import { stepChanges, type StepChangeFinding } from "./step-change";
import { stuckChannels, type StuckFinding } from "./stuck-channel";
import { swappedSides, type SwappedSidesFinding } from "./swapped-sides";
import { unitPlausibility, type UnitFinding } from "./unit-plausibility";

/** All that any check can find. */
export type ReadingFinding =
  | SpikeFinding
  | StuckFinding
  | StepChangeFinding
  | SwappedSidesFinding
  | NegativeFlowFinding
  | UnitFinding
  | NoFlowNoiseFinding
  | GapsFinding
  | FarDatesFinding
  | ClockFinding
  | ClockHintFinding;

/** What the checks need to know of where the readings come from. Null is unknown. */
export interface CheckContext {
  readonly service: LoopService;
  readonly boreMm: number | null;
  readonly designFlowM3PerHour: number | null;
  readonly designDeltaTK: number | null;
  readonly flowCutOffM3PerHour: number | null;
  /** Half-width, m/s; the wide default where nobody proved a zero. */
  readonly zeroUncertaintyMPerS: number | null;
  /** Units the columns were converted from. */
  readonly flowUnit: FlowUnit;
  readonly temperatureUnit: TemperatureUnit;
  readonly gapRule: GapRule;
  readonly latestMs: number | null;
  readonly clockNotes: readonly ClockNote[];
  /** Flow and temperatures come from loggers with a clock each. */
  readonly hasTwoClocks: boolean;
}

/** A check that could not be made, and what it lacks. */
export interface NotChecked {
  readonly check:
    "spikes" | "flowUnit" | "noFlowNoise" | "swappedSides" | "negativeFlow" | "clockOff";
  readonly lacks: "boreMm" | "flow" | "temperatures" | "clockNotes" | "oneService";
}

/**
 * Every check of one series, changing nothing. Findings come in the order of the checks; see
 * `rankFindings` for the order in which to settle them. What could not be checked is said, so that
 * silence is never taken for soundness. Time grows with the rows, and not with their square.
 */
export function checkReadings(
  segment: ReadingSegment,
  context: CheckContext,
): { readonly findings: readonly ReadingFinding[]; readonly notChecked: readonly NotChecked[] } {
  const { flowM3PerHour, supplyC, returnC } = segment.columns;
  const noFlow = {
    boreMm: context.boreMm,
    ...(context.zeroUncertaintyMPerS === null
      ? {}
      : { zeroUncertaintyMPerS: context.zeroUncertaintyMPerS }),
  };
  const findings = [
    farDates(segment, context),
    ...unitPlausibility(segment, context),
    swappedSides(segment, { ...noFlow, service: context.service }),
    ...reversedFlow(segment, noFlow),
    ...stepChanges(segment, noFlow),
    ...stuckChannels(segment, context),
    ...hampelSpikes(segment, context),
    clockOff(segment, context.clockNotes),
    context.hasTwoClocks ? clockHint(segment) : null,
    gapsFinding(segment, context.gapRule),
    noFlowNoise(segment, { ...noFlow, flowCutOffM3PerHour: context.flowCutOffM3PerHour }),
  ].filter((finding) => finding !== null);
  const hasTemperatures = supplyC !== null && returnC !== null;
  const notChecked: NotChecked[] = [];
  const lacking = (isLacking: boolean, missing: NotChecked) => {
    if (isLacking) notChecked.push(missing);
  };
  const hasFlow = flowM3PerHour !== null;
  lacking(!hasFlow, { check: "negativeFlow", lacks: "flow" });
  lacking(!hasFlow, { check: "swappedSides", lacks: "flow" });
  lacking(hasFlow && context.boreMm === null, { check: "spikes", lacks: "boreMm" });
  lacking(hasFlow && context.boreMm === null, { check: "flowUnit", lacks: "boreMm" });
  lacking(hasFlow && context.boreMm === null, { check: "noFlowNoise", lacks: "boreMm" });
  lacking(!hasTemperatures, { check: "swappedSides", lacks: "temperatures" });
  lacking(context.service === "changeover", { check: "swappedSides", lacks: "oneService" });
  lacking(context.clockNotes.length === 0, { check: "clockOff", lacks: "clockNotes" });
  return { findings, notChecked };
}
