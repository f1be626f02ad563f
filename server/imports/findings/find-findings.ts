import type { NotCheckedView } from "@shared/contracts/import-findings";
import { FLOW_UNITS, TEMPERATURE_UNITS } from "@shared/domain/log-files/column-units";
import type { FileRecipe, FlowUnit, TemperatureUnit } from "@shared/domain/log-files/recipe";
import {
  checkFile,
  checkSeries,
  type ReadingFinding,
} from "@shared/domain/readings/checks/check-readings";
import type { ClockNote } from "@shared/domain/readings/checks/clock-notes";
import {
  correctSegments,
  type SegmentCorrection,
} from "@shared/domain/readings/corrections/correct-segments";
import { hasCounters } from "@shared/domain/readings/counter-steps";
import { nominalStepMs } from "@shared/domain/readings/nominal-step";
import type { ReadingSegment } from "@shared/domain/readings/reading-columns";
import type { CheckedFile } from "../file-checks";
import type { ImportCheckContext } from "./check-context";

/** A finding of an import with its place in the list. */
export interface FoundFinding {
  /** Stays the same when the import is checked again, and wherever the same file is imported. */
  readonly key: string;
  /** Null where several files took part. */
  readonly fileId: string | null;
  readonly finding: ReadingFinding;
  /** The readings it is about, for its picture. */
  readonly segment: ReadingSegment;
}

export interface FoundFindings {
  readonly findings: readonly FoundFinding[];
  readonly notChecked: readonly NotCheckedView[];
}

/** More stretches than one correction may name: then none of them can be left out one by one. */
const MOST_SPANS = 5000;

/**
 * All that the files' readings show, with what already corrects the point on them: a stretch that was
 * swapped before is not found swapped again. What is chosen in this import is not on them, so that a
 * finding stays in the list when it is settled.
 * @param onStep called between the checks; may throw to stop the work
 * @param own the files' rows as segments, nothing else of the point among them
 */
export function findFindings(
  files: readonly CheckedFile[],
  own: readonly ReadingSegment[],
  standing: readonly SegmentCorrection[],
  context: ImportCheckContext,
  onStep: () => void,
): FoundFindings {
  const found: Omit<FoundFinding, "key">[] = [];
  const notChecked: NotCheckedView[] = [];
  for (const file of files) {
    const segment = segmentOf(file);
    if (segment === null) continue;
    const [corrected] = correctSegments([segment], withoutSplits(standing));
    if (!corrected) continue;
    const result = checkFile(corrected, {
      ...context.place,
      ...unitsOf(file.recipe),
      latestMs: context.latestMs,
      clockNotes: notesOf(file.recipe, context),
      onStep,
    });
    const { fileId } = file;
    const reachMs = files.length > 1 && !leads(file) ? corrected.nominalStepMs : 0;
    for (const finding of result.findings)
      found.push({ fileId, finding: reaching(finding, reachMs), segment: corrected });
    notChecked.push(...result.notChecked.map((missing) => ({ ...missing, fileId })));
  }
  const hasTwoClocks = clocksOf(files) > 1;
  for (const segment of correctSegments(own, standing)) {
    if (segment.columns.instantMs.length === 0) continue;
    const result = checkSeries(segment, { ...context.place, hasTwoClocks, onStep });
    for (const finding of result.findings)
      found.push({ fileId: fileOf(files, finding), finding, segment });
    for (const missing of result.notChecked)
      if (!notChecked.some((other) => isSame(other, missing)))
        notChecked.push({ ...missing, fileId: null });
  }
  return { findings: keyed(found.map(bounded)), notChecked };
}

const isSame = (a: NotCheckedView, b: { readonly check: string; readonly lacks: string }) =>
  a.fileId === null && a.check === b.check && a.lacks === b.lacks;

/** A file is looked at whole, wherever somebody parted the point's readings. */
const withoutSplits = (corrections: readonly SegmentCorrection[]) =>
  corrections.filter(({ kind }) => kind !== "split");

/** The rows of one file by themselves; null where it holds none. */
export function segmentOf({ columns, kind, resolved }: CheckedFile): ReadingSegment | null {
  if (columns === null || columns.instantMs.length === 0) return null;
  const stepMs = resolved.nominalStepMs ?? nominalStepMs(columns.instantMs) ?? 0;
  return { kind, nominalStepMs: stepMs, columns };
}

/** The units a file's flow and temperatures are written in; null where they come otherwise. */
export function unitsOf({ columns }: FileRecipe): {
  readonly flowUnit: FlowUnit | null;
  readonly temperatureUnit: TemperatureUnit | null;
} {
  const unitOf = (meaning: string) => columns.find((column) => column.meaning === meaning)?.unit;
  const flow = unitOf("flow");
  const supply = unitOf("supply") ?? unitOf("return");
  const returned = unitOf("return") ?? supply;
  return {
    flowUnit: FLOW_UNITS.find((unit) => unit === flow) ?? null,
    temperatureUnit:
      supply === returned ? (TEMPERATURE_UNITS.find((unit) => unit === supply) ?? null) : null,
  };
}

/** What was noted for the file itself counts before what the installation's record says. */
function notesOf({ time }: FileRecipe, { clockNotes }: ImportCheckContext): readonly ClockNote[] {
  const own = time.notes ?? [];
  if (own.length === 0) return clockNotes;
  return own.map(({ loggerAt, rightAt }) => ({
    loggerMs: Date.parse(loggerAt),
    referenceMs: Date.parse(rightAt),
  }));
}

/** Whether a file gives the instants, and does not lend its temperatures to one that does. */
const leads = ({ columns }: CheckedFile) =>
  columns !== null && (!!columns.flowM3PerHour || !!columns.powerKw || hasCounters(columns));

function clocksOf(files: readonly CheckedFile[]): number {
  const lends = files.some(
    (file) => !leads(file) && !!(file.columns?.supplyC ?? file.columns?.returnC),
  );
  return lends && files.some(leads) ? 2 : 1;
}

/** A lent temperature is drawn to the flow's instants, so a wrong one reaches to its neighbours. */
function reaching(finding: ReadingFinding, reachMs: number): ReadingFinding {
  if (reachMs === 0) return finding;
  const choices = finding.choices.map((choice) =>
    choice.change === "exclude"
      ? {
          ...choice,
          spans: choice.spans.map(({ startMs, endMs }) => ({
            startMs: startMs - reachMs,
            endMs: endMs + reachMs,
          })),
        }
      : choice,
  );
  return { ...finding, choices } as ReadingFinding;
}

/** The one file a finding is about; null where several share its channel or took part. */
function fileOf(files: readonly CheckedFile[], { channel }: ReadingFinding): string | null {
  const candidates = channel === null ? files : files.filter(({ columns }) => !!columns?.[channel]);
  const [only, ...others] = candidates.length === 0 ? files : candidates;
  return only && others.length === 0 ? only.fileId : null;
}

function bounded(found: Omit<FoundFinding, "key">): Omit<FoundFinding, "key"> {
  const choices = found.finding.choices.filter(
    (choice) => choice.change !== "exclude" || choice.spans.length <= MOST_SPANS,
  );
  const finding = { ...found.finding, choices } as ReadingFinding;
  return { ...found, finding };
}

function keyed(found: readonly Omit<FoundFinding, "key">[]): FoundFinding[] {
  const taken = new Map<string, number>();
  return found.map((each) => {
    const { code, channel, spans } = each.finding;
    const [first] = spans;
    const at = first ? new Date(first.startMs).toISOString() : "";
    const key = `${code} ${channel ?? "all"} ${at}`;
    const times = (taken.get(key) ?? 0) + 1;
    taken.set(key, times);
    return { ...each, key: times === 1 ? key : `${key} ${times}` };
  });
}
