import type { ReadingSegment } from "@shared/domain/readings/reading-columns";
import { DAY_MS, type Interval } from "@shared/domain/time/interval";
import type { Database } from "@server/database/connect";
import { gapFactorOf, loadBlocks, segmentsOf } from "@server/readings/load-segments";
import { breathe } from "./breathe";

/** Two months of one-minute rows take some 20 ms to unpack: other requests are served between. */
const partMs = 60 * DAY_MS;

export interface ReadingPart extends Interval {
  /** Rows of the part, and one beyond either end. */
  readonly segments: readonly ReadingSegment[];
  /** A step over this many nominal steps is a hole, by the point's rule. */
  readonly gapFactor: number;
}

/**
 * The readings of a range a part at a time, so that no long stretch holds the server up. The
 * database works on the next part while one is unpacked and used.
 */
export async function* readingParts(
  database: Database,
  pointId: string,
  range: Interval,
): AsyncGenerator<ReadingPart> {
  const load = (startMs: number) =>
    Promise.allSettled([loadBlocks(database, pointId, startMs, partEnd(startMs, range))]);
  let following = load(range.startMs);
  for (let startMs = range.startMs; startMs < range.endMs; startMs += partMs) {
    const [blocks] = await following;
    if (blocks.status === "rejected") throw blocks.reason;
    const endMs = partEnd(startMs, range);
    if (endMs < range.endMs) following = load(endMs);
    yield {
      startMs,
      endMs,
      segments: segmentsOf(blocks.value, startMs, endMs),
      gapFactor: gapFactorOf(blocks.value),
    };
    await breathe();
  }
}

function partEnd(startMs: number, range: Interval): number {
  return Math.min(startMs + partMs, range.endMs);
}
