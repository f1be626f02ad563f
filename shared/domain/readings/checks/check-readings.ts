import type { LoopService } from "../../energy/power";
import type { FlowUnit, TemperatureUnit } from "../../log-files/recipe";
import type { ReadingSegment } from "../reading-columns";
import { clockHint, type ClockHintFinding } from "./clock-hints";
import { clockOff, type ClockFinding, type ClockNote } from "./clock-notes";
import { farDates, type FarDatesFinding } from "./far-dates";
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
  | FarDatesFinding
  | ClockFinding
  | ClockHintFinding;

/** What the checks need to know of the point and its loop. Null is unknown. */
export interface PlaceContext {
  readonly service: LoopService;
  readonly boreMm: number | null;
  readonly designFlowM3PerHour: number | null;
  readonly designDeltaTK: number | null;
  readonly flowCutOffM3PerHour: number | null;
  /** Half-width, m/s; the wide default where nobody proved a zero. */
  readonly zeroUncertaintyMPerS: number | null;
}

/** Checks of millions of rows take seconds: somebody who cancels is heard between them. */
interface Stoppable {
  /** Called before each check; may throw to stop the work. */
  readonly onStep?: () => void;
}

/** What the checks of one logger's rows need to know besides. */
export interface FileContext extends PlaceContext, Stoppable {
  /** Units the columns were converted from; null where they come from no such column. */
  readonly flowUnit: FlowUnit | null;
  readonly temperatureUnit: TemperatureUnit | null;
  readonly latestMs: number | null;
  readonly clockNotes: readonly ClockNote[];
}

/** What the checks of a point's readings, put together, need to know besides. */
export interface SeriesContext extends PlaceContext, Stoppable {
  /** Flow and temperatures come from loggers with a clock each. */
  readonly hasTwoClocks: boolean;
}

/** A check that could not be made, and what it lacks. */
export interface NotChecked {
  readonly check:
    | "spikes"
    | "flowUnit"
    | "noFlowNoise"
    | "swappedSides"
    | "negativeFlow"
    | "stuckChannel"
    | "stepChange"
    | "clockOff";
  readonly lacks: "boreMm" | "flow" | "temperatures" | "clockNotes" | "oneService" | "companion";
}

export interface CheckResult {
  readonly findings: readonly ReadingFinding[];
  /** Silence is never taken for soundness. */
  readonly notChecked: readonly NotChecked[];
}

/**
 * The checks of what one logger wrote, by itself: dates, units, spikes, its clock. Changes nothing.
 * Findings come in the order of the checks; see `rankFindings`. Time grows with the rows, and not with
 * their square.
 */
export function checkFile(segment: ReadingSegment, context: FileContext): CheckResult {
  const { flowUnit, temperatureUnit } = context;
  const hasFlow = segment.columns.flowM3PerHour !== null;
  const findings = inTurn(context, [
    () => [farDates(segment, context)],
    () => unitPlausibility(segment, { ...context, flowUnit, temperatureUnit }),
    () => hampelSpikes(segment, context),
    () => [clockOff(segment, context.clockNotes)],
  ]);
  const lacksBore = hasFlow && context.boreMm === null;
  return {
    findings,
    notChecked: listed([
      [lacksBore, { check: "spikes", lacks: "boreMm" }],
      [lacksBore && flowUnit !== null, { check: "flowUnit", lacks: "boreMm" }],
      [context.clockNotes.length === 0, { check: "clockOff", lacks: "clockNotes" }],
    ]),
  };
}

/** The checks of what a point's channels say together. As {@link checkFile} otherwise. */
export function checkSeries(segment: ReadingSegment, context: SeriesContext): CheckResult {
  const { flowM3PerHour, supplyC, returnC, powerKw } = segment.columns;
  const noFlow = {
    boreMm: context.boreMm,
    ...(context.zeroUncertaintyMPerS === null
      ? {}
      : { zeroUncertaintyMPerS: context.zeroUncertaintyMPerS }),
  };
  const { onStep, flowCutOffM3PerHour } = context;
  const findings = inTurn(context, [
    () => [swappedSides(segment, { ...noFlow, service: context.service })],
    () => reversedFlow(segment, noFlow),
    () => stepChanges(segment, { ...noFlow, ...(onStep && { onStep }) }),
    () => stuckChannels(segment, context),
    () => [context.hasTwoClocks ? clockHint(segment) : null],
    () => [noFlowNoise(segment, { ...noFlow, flowCutOffM3PerHour })],
  ]);
  const hasFlow = flowM3PerHour !== null;
  const hasTemperatures = supplyC !== null && returnC !== null;
  const channels = [flowM3PerHour, supplyC, returnC, powerKw ?? null];
  const isAlone = channels.filter((channel) => channel !== null).length < 2;
  return {
    findings,
    notChecked: listed([
      [!hasFlow, { check: "negativeFlow", lacks: "flow" }],
      [!hasFlow, { check: "swappedSides", lacks: "flow" }],
      [!hasTemperatures, { check: "swappedSides", lacks: "temperatures" }],
      [context.service === "changeover", { check: "swappedSides", lacks: "oneService" }],
      [hasFlow && context.boreMm === null, { check: "noFlowNoise", lacks: "boreMm" }],
      [isAlone, { check: "stuckChannel", lacks: "companion" }],
      [isAlone, { check: "stepChange", lacks: "companion" }],
    ]),
  };
}

function inTurn(
  { onStep }: Stoppable,
  checks: readonly (() => readonly (ReadingFinding | null)[])[],
): ReadingFinding[] {
  return checks.flatMap((check) => {
    onStep?.();
    return check().filter((finding) => finding !== null);
  });
}

function listed(candidates: readonly (readonly [boolean, NotChecked])[]): NotChecked[] {
  return candidates.flatMap(([isLacking, missing]) => (isLacking ? [missing] : []));
}
