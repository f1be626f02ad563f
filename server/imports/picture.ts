import type { ImportChecks } from "@shared/contracts/import-checks";
import { qualityRuns } from "@shared/domain/readings/quality-runs";
import { RowQuality, type ReadingSegment } from "@shared/domain/readings/reading-columns";
import type { Interval } from "@shared/domain/time/interval";

const columnCount = 240;
/** More stretches than this could not be told apart in a strip of 240 columns. */
const mostStretches = 480;

type Picture = NonNullable<ImportChecks["picture"]>;

const isoOf = (ms: number) => new Date(ms).toISOString();
const round = (value: number) => Math.round(value * 1000) / 1000;

/** A small picture of the readings: means of 240 equal stretches, null where none was measured. */
export function pictureOf(segments: readonly ReadingSegment[], span: Interval): Picture | null {
  const lengthMs = (span.endMs - span.startMs) / columnCount;
  if (!(lengthMs > 0)) return null;
  const flow = new Means();
  const supply = new Means();
  const back = new Means();
  for (const { columns } of segments) {
    const { instantMs, quality, flowM3PerHour, supplyC, returnC } = columns;
    for (let i = 0; i < instantMs.length; i++) {
      if (quality[i] === RowQuality.excluded) continue;
      const at = Math.floor(((instantMs[i] as number) - span.startMs) / lengthMs);
      if (at < 0 || at >= columnCount) continue;
      flow.add(at, flowM3PerHour?.[i]);
      supply.add(at, supplyC?.[i]);
      back.add(at, returnC?.[i]);
    }
  }
  return {
    from: isoOf(span.startMs),
    to: isoOf(span.endMs),
    flowM3PerHour: flow.values(),
    supplyC: supply.values(),
    returnC: back.values(),
    quality: qualityRuns(segments, span)
      .slice(0, mostStretches)
      .map(({ startMs, endMs, kind }) => ({ from: isoOf(startMs), to: isoOf(endMs), kind })),
  };
}

class Means {
  private readonly sums = new Float64Array(columnCount);
  private readonly counts = new Uint32Array(columnCount);

  add(column: number, value: number | undefined): void {
    if (value === undefined || Number.isNaN(value)) return;
    this.sums[column] = (this.sums[column] as number) + value;
    this.counts[column] = (this.counts[column] as number) + 1;
  }

  values(): (number | null)[] {
    return Array.from(this.sums, (sum, i) =>
      this.counts[i] === 0 ? null : round(sum / (this.counts[i] as number)),
    );
  }
}
