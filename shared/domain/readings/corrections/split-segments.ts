import { mapChannels, type ReadingColumns, type ReadingSegment } from "../reading-columns";
import { firstFrom } from "./correction-span";

/**
 * Parts segments at an instant: rows from it on begin a segment of their own, and nothing is joined,
 * interpolated or averaged between the row before and the row after. Rows keep their values. A mean
 * labelled with its end belongs to the part before where its label is the instant.
 *
 * Between the last row before and the first one after nobody knows what the channel showed: of
 * moments, that one step is a hole.
 *
 * Example: quarter-hours to 10:00 and from 10:15 on, parted at 10:15 → two segments; the quarter-hour
 * between them is not covered.
 */
export function splitSegments(
  segments: readonly ReadingSegment[],
  atMs: number,
): readonly ReadingSegment[] {
  let following: ReadingSegment | null = null;
  const parts: ReadingSegment[] = [];
  let isParted = false;
  for (const segment of segments) {
    const { instantMs } = segment.columns;
    const row = firstFrom(instantMs, segment.kind === "meanToLabel" ? atMs + 1 : atMs);
    if (row > 0 && row < instantMs.length) {
      isParted = true;
      parts.push(rowsOf(segment, 0, row));
      parts.push({ ...rowsOf(segment, row, instantMs.length), startsAnew: true });
      continue;
    }
    parts.push(segment);
    const isLater = row === 0 && instantMs.length > 0;
    if (isLater && (following === null || instantMs[0]! < following.columns.instantMs[0]!))
      following = segment;
  }
  if (isParted || following === null) return parts;
  // It falls between two segments: the later one starts anew.
  return parts.map((part) => (part === following ? { ...part, startsAnew: true } : part));
}

function rowsOf(segment: ReadingSegment, from: number, to: number): ReadingSegment {
  const columns: ReadingColumns = {
    instantMs: segment.columns.instantMs.subarray(from, to),
    quality: segment.columns.quality.subarray(from, to),
    ...mapChannels(segment.columns, (values) => values.subarray(from, to)),
  };
  return { ...segment, columns };
}
