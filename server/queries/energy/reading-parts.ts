import type { ReadingSegment } from "@shared/domain/readings/reading-columns";
import { DAY_MS, type Interval } from "@shared/domain/time/interval";
import type { Database } from "@server/database/connect";
import { loadSegments } from "@server/readings/load-segments";
import { breathe } from "./breathe";

/** Two months of one-minute rows take some 20 ms to unpack: other requests are served between. */
const partMs = 60 * DAY_MS;

export interface ReadingPart extends Interval {
  /** Rows of the part, and one beyond either end. */
  readonly segments: readonly ReadingSegment[];
}

/** The readings of a range a part at a time, so that no long stretch holds the server up. */
export async function* readingParts(
  database: Database,
  pointId: string,
  range: Interval,
): AsyncGenerator<ReadingPart> {
  for (let startMs = range.startMs; startMs < range.endMs; startMs += partMs) {
    const endMs = Math.min(startMs + partMs, range.endMs);
    yield { startMs, endMs, segments: await loadSegments(database, pointId, startMs, endMs) };
    await breathe();
  }
}
