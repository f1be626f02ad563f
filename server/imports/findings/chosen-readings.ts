import type { CorrectionChange } from "@shared/contracts/corrections";
import { correctClock } from "@shared/domain/readings/corrections/clock";
import type { SegmentCorrection } from "@shared/domain/readings/corrections/correct-segments";
import { clockErrorOf, segmentCorrections } from "@server/readings/point-corrections";
import type { CheckedFile } from "../file-checks";

/** Files with the clocks that changes put right; the same files where none does. */
export function withClocks<File extends CheckedFile>(
  files: readonly File[],
  changes: readonly CorrectionChange[],
): readonly File[] {
  return changes.reduce<readonly File[]>(
    (corrected, change) =>
      change.kind !== "clock"
        ? corrected
        : corrected.map((file) =>
            file.fileId === change.logFileId && file.columns !== null
              ? { ...file, columns: correctClock(file.columns, clockErrorOf(change)) }
              : file,
          ),
    files,
  );
}

/** Changes chosen in an import as they are put on resolved segments; none of them is a probe's. */
export function onSegments(changes: readonly CorrectionChange[]): SegmentCorrection[] {
  return changes.flatMap((change) => segmentCorrections(change, [], null));
}
