import type { ImportChecks } from "@shared/contracts/import-checks";
import { waterSeconds } from "@shared/domain/energy/totals";
import type { RepairStepCode } from "@shared/domain/log-files/repair-step";
import type { RepairChoices } from "@shared/domain/log-files/recipe";
import {
  RowQuality,
  type ReadingChannel,
  type ReadingSegment,
} from "@shared/domain/readings/reading-columns";
import { hasCounters } from "@shared/domain/readings/counter-steps";
import {
  correctSegments,
  type SegmentCorrection,
} from "@shared/domain/readings/corrections/correct-segments";
import { resolveSegments, type ReadingSource } from "@shared/domain/readings/resolve-segments";
import type { Interval } from "@shared/domain/time/interval";
import { localDaysBetween } from "@shared/domain/time/local-calendar";
import { calculateSpan } from "@server/readings/calculate-energy";
import type { EnergySettings } from "@server/readings/energy-settings";
import { liquidC } from "@server/readings/fluid-block";
import { energyBlock } from "@server/readings/point-readings";
import { ChannelBit } from "@server/readings/stored-rows";
import { counterEventSteps } from "./counter-events";
import { findingsBasis, type ImportCheckContext } from "./findings/check-context";
import { chosenChanges, offeredClocks } from "./findings/choices";
import { ChoiceEnergy } from "./findings/choice-energy";
import { onSegments, withClocks } from "./findings/chosen-readings";
import { findFindings } from "./findings/find-findings";
import { isUndecided, shownFindings } from "./findings/import-findings";
import { sourcesOf, spanOf } from "./import-sources";
import { findOverlap, type Overlap } from "./overlap";
import { fileChecks, type CheckedFile } from "./file-checks";
import { pictureOf } from "./picture";

/** Names of what is looked for in every file; those that found nothing are listed as clean. */
const lookedFor: readonly (RepairStepCode | "gaps")[] = [
  "unreadableTimes",
  "unreadableCells",
  "shortRows",
  "sentinels",
  "identicalRepeats",
  "conflictingRepeats",
  "outOfOrder",
  "repeatedHour",
  "missingHour",
  "weakSignal",
  "overlapEqual",
  "overlapDifferent",
  "gaps",
];

/** Names of what is looked for in the readings themselves, where it can be. */
const lookedForInReadings = [
  "farDates",
  "flowUnit",
  "temperatureUnit",
  "swappedSides",
  "negativeFlow",
  "stuckChannel",
  "spikes",
  "stepChange",
  "noFlowNoise",
  "clockOff",
] as const;

/** What a check works with: the import's files read by their recipes, and what the point holds. */
export interface CheckInput {
  /** Called between parts of the work; may throw to stop it. */
  readonly onStep: () => void;
  readonly files: readonly CheckedFile[];
  readonly stored: readonly ReadingSource[];
  readonly settings: EnergySettings;
  readonly choices: RepairChoices;
  /** What corrects stretches of the point, the files' own included. */
  readonly corrections: readonly SegmentCorrection[];
  readonly context: ImportCheckContext;
}

/** Above or below whatever is stored, as the choice says. */
const farAbove = 1e9;

/** How each file meets what is stored and the files before it in the same import. */
export function overlapsOf(
  files: readonly CheckedFile[],
  stored: readonly ReadingSource[],
): (Overlap | null)[] {
  const others = stored.map(({ columns }) => columns);
  return files.map(({ columns, line }) => {
    if (columns === null) return null;
    const overlap = findOverlap(columns, line, others);
    others.push(columns);
    return overlap;
  });
}

/**
 * The whole import without storing it: what the rows come to, what was done to them, what is still
 * to be chosen, and the energy the point would have over the files' time. While a choice is open the
 * figures take the first reading of a conflict, keep weak signals and keep what is stored.
 */
export function checkImport(input: CheckInput): ImportChecks {
  const { files, stored, settings, choices, corrections, context, onStep } = input;
  const overlaps = overlapsOf(files, stored);
  const checked = files.map((file, i) =>
    fileChecks(
      file,
      overlaps[i] ?? null,
      settings.zone,
      counterEventSteps(file, settings.meterPlace),
    ),
  );
  const asked = new Set(
    files.flatMap(({ resolved }) => resolved.questions.map(({ code }) => code)),
  );
  const isDifferent = overlaps.some((overlap) => (overlap?.different.count ?? 0) > 0);
  const undecided: ImportChecks["undecided"] = [];
  if (asked.has("conflictingRepeats")) undecided.push("conflictingRepeats");
  if (asked.has("weakSignal")) undecided.push("weakSignal");
  if (isDifferent && choices.overlap === null) undecided.push("overlap");

  const own = resolveSegments(sourcesOf(files, 1, settings.meterPlace));
  const inReadings = findFindings(files, own, corrections, context, onStep);
  if (isUndecided(inReadings, choices)) undecided.push("findings");
  const changes = chosenChanges(inReadings.findings, choices).map(({ change }) => change);

  // A clock that is put right moves a file's rows: both times are looked at.
  const moved = withClocks(files, changes);
  const span = spanOf([...files, ...moved]);
  const precedence = choices.overlap === "useThis" || !isDifferent ? farAbove : -farAbove;
  const reach = spanOf([...files, ...withClocks(files, offeredClocks(inReadings.findings))]);
  const energy =
    reach &&
    new ChoiceEnergy({
      files,
      stored,
      precedence,
      settings,
      standing: corrections,
      span: reach,
      onStep,
    });
  const together = energy?.segmentsWith(changes) ?? [];
  const result = energyOf(together, settings, span, onStep);
  const isWhole = span?.startMs === reach?.startMs && span?.endMs === reach?.endMs;
  if (isWhole && result.energy)
    energy?.remember(changes, { ...result.energy, volumeM3: result.energy.volumeM3 ?? 0 });
  const found = new Set<string>([
    ...checked.flatMap((file) => [
      ...file.steps.map(({ code }) => code),
      ...(file.gapCount > 0 ? ["gaps"] : []),
    ]),
    ...inReadings.findings.map(({ finding }) => checkOf(finding.code)),
    ...inReadings.notChecked.map(({ check }) => check),
  ]);
  const placed = moved === files ? own : resolveSegments(sourcesOf(moved, 1, settings.meterPlace));
  const chosen = correctSegments(placed, onSegments(changes));
  return {
    findingsBasis: findingsBasis(context, corrections, settings),
    undecided,
    files: checked,
    rows: rowsOf(chosen.length > 0 ? chosen : companionsAlone(files)),
    rowsWithoutTemperature: rowsWithoutTemperature(files, together, span),
    ...result,
    picture: span && pictureOf(chosen, span),
    ...shownFindings(inReadings, energy, { files, choices, context, settings }),
    clean: [...lookedFor, ...lookedForInCounters(files), ...lookedForInReadings].filter(
      (name) => !found.has(name),
    ),
  };
}

/** The check that a finding comes from, as the list of those that found nothing names it. */
function checkOf(code: string): string {
  return ["reversedFlow", "backflow", "flowTurns"].includes(code) ? "negativeFlow" : code;
}

function lookedForInCounters(files: readonly CheckedFile[]): RepairStepCode[] {
  const counts = files.some(({ columns }) => columns !== null && hasCounters(columns));
  return counts ? ["counterReset", "counterJump"] : [];
}

/** Files that hold companion series alone give no segment, and yet they have rows. */
function companionsAlone(files: readonly CheckedFile[]): ReadingSegment[] {
  return files.flatMap(({ columns, kind, resolved: { nominalStepMs } }) =>
    columns === null || columns.instantMs.length === 0
      ? []
      : [{ kind, nominalStepMs: nominalStepMs ?? 0, columns }],
  );
}

function rowsOf(segments: readonly ReadingSegment[]): ImportChecks["rows"] {
  const rows = { measured: 0, excluded: 0, noReading: 0, missing: 0, expected: 0 };
  for (const { columns, nominalStepMs } of segments) {
    const { instantMs, quality } = columns;
    const count = instantMs.length;
    for (let i = 0; i < count; i++) {
      if (quality[i] === RowQuality.excluded) rows.excluded++;
      else if (quality[i] === RowQuality.noReading) rows.noReading++;
      else rows.measured++;
    }
    const spanMs = (instantMs[count - 1] as number) - (instantMs[0] as number);
    const due = nominalStepMs > 0 ? Math.round(spanMs / nominalStepMs) + 1 : count;
    rows.missing += Math.max(0, due - count);
    rows.expected += Math.max(due, count);
  }
  return rows;
}

/** Flow rows of files without own temperatures for which no temperature is near enough. */
function rowsWithoutTemperature(
  files: readonly CheckedFile[],
  together: readonly ReadingSegment[],
  span: Interval | null,
): number {
  const borrows = files.some(
    ({ columns }) =>
      (columns?.flowM3PerHour || columns?.volumeCounterM3) && !(columns.supplyC && columns.returnC),
  );
  if (!borrows || span === null) return 0;
  let count = 0;
  for (const { columns } of together) {
    const { instantMs, flowM3PerHour, supplyC, returnC, quality } = columns;
    if (!flowM3PerHour || columns.powerKw || columns.heatingKw || columns.coolingKw) continue;
    for (let i = 0; i < instantMs.length; i++) {
      const at = instantMs[i] as number;
      if (at < span.startMs || at > span.endMs || quality[i] === RowQuality.excluded) continue;
      if (Number.isNaN(flowM3PerHour[i])) continue;
      if (Number.isNaN(supplyC?.[i] ?? NaN) || Number.isNaN(returnC?.[i] ?? NaN)) count++;
    }
  }
  return count;
}

function energyOf(
  segments: readonly ReadingSegment[],
  settings: EnergySettings,
  span: Interval | null,
  onStep: () => void,
): Pick<
  ImportChecks,
  | "energy"
  | "energyBlockedBy"
  | "rowsAgainstRegister"
  | "daily"
  | "rowsOutsideFluid"
  | "outsideFluidExamples"
  | "liquidC"
> {
  const days = span
    ? localDaysBetween({ ...span, endMs: Math.max(span.endMs, span.startMs + 1) }, settings.zone)
    : [];
  // A stretch leaves out its end, but the last row counts as a row.
  const window = span && { ...span, endMs: span.endMs + 1 };
  const result = window && calculateSpan(segments, settings, days, window, onStep);
  const totals = result && result.totals;
  const blockedBy = energyBlock(settings, {
    channels: span ? channelsOf(segments) : null,
    measuredRows: totals?.measuredRows ?? 0,
    outsideFluidRows: result?.outsideFluidRows ?? 0,
  });
  const outside = {
    rowsOutsideFluid: result?.outsideFluidRows ?? 0,
    liquidC: liquidC(settings.fluid),
    outsideFluidExamples: (result?.outsideFluid ?? []).map(({ instantMs, channel, problem }) => ({
      instant: new Date(instantMs).toISOString(),
      channel,
      valueC: problem.value,
      reason: problem.code,
    })),
  };
  if (!result || !totals || blockedBy !== null)
    return { energy: null, energyBlockedBy: blockedBy, daily: [], ...outside };
  return {
    energy: {
      heatingKwh: totals.heating.energyKwh,
      coolingKwh: totals.cooling.energyKwh,
      suppressedKwh: totals.suppressedKwh,
      volumeM3: waterSeconds(totals) > 0 ? totals.volumeM3 : null,
      coveredS: totals.coveredS,
    },
    energyBlockedBy: null,
    rowsAgainstRegister: totals.againstRows,
    daily: result.days.map(({ date, lengthS, totals: day }) => ({
      date,
      heatingKwh: day.coveredS > 0 ? day.heating.energyKwh : null,
      coolingKwh: day.coveredS > 0 ? day.cooling.energyKwh : null,
      coveredS: day.coveredS,
      lengthS,
    })),
    ...outside,
  };
}

function channelsOf(segments: readonly ReadingSegment[]): number {
  const has = (name: ReadingChannel) => segments.some(({ columns }) => !!columns[name]);
  return (
    (has("powerKw") ? ChannelBit.power : 0) +
    (has("heatingKw") ? ChannelBit.heatingCounter : 0) +
    (has("coolingKw") ? ChannelBit.coolingCounter : 0) +
    (has("flowM3PerHour") ? ChannelBit.flow : 0) +
    (has("supplyC") ? ChannelBit.supply : 0) +
    (has("returnC") ? ChannelBit.return : 0)
  );
}
