import type { ReadingSource } from "@shared/domain/readings/resolve-segments";
import type { Interval } from "@shared/domain/time/interval";
import { meterFacts, type MeterPlace } from "@server/readings/meter-facts";
import type { CheckedFile } from "./file-checks";

/** The rows of an import's files as they are put together with what the point holds. */
export function sourcesOf(
  files: readonly CheckedFile[],
  precedence: number,
  place: MeterPlace,
): ReadingSource[] {
  return files.flatMap(({ kind, resolved, columns, recipe }) => {
    if (columns === null) return [];
    const meter = meterFacts(recipe, place);
    const { nominalStepMs } = resolved;
    return [{ precedence, kind, nominalStepMs, columns, ...(meter && { meter }) }];
  });
}

/** From the first to the last moment the files speak for; null where no row is left. */
export function spanOf(files: readonly CheckedFile[]): Interval | null {
  let startMs = Infinity;
  let endMs = -Infinity;
  for (const { columns, kind, resolved } of files) {
    if (columns === null || columns.instantMs.length === 0) continue;
    const stepMs = resolved.nominalStepMs ?? 0;
    const first = columns.instantMs[0] as number;
    const last = columns.instantMs[columns.instantMs.length - 1] as number;
    startMs = Math.min(startMs, kind === "meanToLabel" ? first - stepMs : first);
    endMs = Math.max(endMs, kind === "meanFromLabel" ? last + stepMs : last);
  }
  return startMs <= endMs ? { startMs, endMs } : null;
}
