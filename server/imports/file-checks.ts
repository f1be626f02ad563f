import type { ImportChecks } from "@shared/contracts/import-checks";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import type { RepairStep } from "@shared/domain/log-files/repair-step";
import { zoneOffsets } from "@shared/domain/time/zone-offsets";
import type { RecognitionFindings } from "@server/models/log-file";
import type { Overlap } from "./overlap";
import { withSteps, type ResolvedFile } from "./resolved-file";

/** A file of an import, resolved, with what its checks need of its recipe and first rows. */
export interface CheckedFile extends ResolvedFile {
  readonly recipe: FileRecipe;
  readonly firstRawLine: number | null;
  readonly findings: RecognitionFindings | null;
}

const mostGaps = 200;
const isoOf = (ms: number) => new Date(ms).toISOString();
const isoOrNull = (ms: number | null) => (ms === null ? null : isoOf(ms));

/** What the checks say about one file. */
export function fileChecks(
  file: CheckedFile,
  overlap: Overlap | null,
  siteZone: string,
  counterSteps: readonly RepairStep[],
): ImportChecks["files"][number] {
  const { resolved } = file;
  const { counts, gaps } = resolved;
  return {
    fileId: file.fileId,
    steps: withSteps(resolved.steps, [
      ...counterSteps,
      ...(overlap ? [overlap.equal, overlap.different] : []),
    ]).map((step) => ({
      ...step,
      examples: [...step.examples],
      countByKind: { ...step.countByKind },
    })),
    rowsRead: counts.read,
    rowsKept: counts.kept,
    firstInstant: isoOrNull(resolved.firstInstantMs),
    lastInstant: isoOrNull(resolved.lastInstantMs),
    nominalStepS: resolved.nominalStepMs === null ? null : resolved.nominalStepMs / 1000,
    expectedRows: counts.expected,
    gaps: gaps.slice(0, mostGaps).map(({ fromMs, toMs, ...gap }) => ({
      from: isoOf(fromMs),
      to: isoOf(toMs),
      ...gap,
    })),
    gapCount: gaps.length,
    firstRow: firstRowOf(file),
    clockChangeInside: hasClockChange(file, siteZone),
  };
}

/** The first row as its logger wrote the time, beside the instant it became. */
function firstRowOf({ recipe, findings, firstRawLine, line, columns }: CheckedFile) {
  const sample = findings?.sampleRows[0];
  if (!sample || columns === null || firstRawLine === null || sample.line !== firstRawLine)
    return null;
  const row = line.indexOf(firstRawLine);
  const instant = columns.instantMs[row];
  if (instant === undefined) return null;
  const cell = recipe.columns
    .filter(({ meaning }) => ["time", "date", "timeOfDay"].includes(meaning))
    .map(({ index }) => sample.cells[index] ?? "")
    .join(" ");
  return { line: firstRawLine, cell, instant: isoOf(instant) };
}

/** Whether clocks of the logger's zone, else of the site's, change between first and last row. */
function hasClockChange({ recipe, resolved }: CheckedFile, siteZone: string): boolean {
  const { firstInstantMs, lastInstantMs } = resolved;
  if (firstInstantMs === null || lastInstantMs === null) return false;
  const clock = recipe.time.clock;
  const offsets = zoneOffsets(clock?.kind === "zone" ? clock.zone : siteZone);
  for (let at = firstInstantMs; at < lastInstantMs;) {
    const { endMs, offsetMs } = offsets.segmentAt(at);
    if (endMs > lastInstantMs) return false;
    if (offsets.offsetAt(endMs) !== offsetMs) return true;
    at = endMs;
  }
  return false;
}
