import { fluidRows } from "../readings/corrections/fluid-span";
import { mapChannels, type ReadingColumns, type ReadingSegment } from "../readings/reading-columns";
import { samplePower, type PowerOptions, type SamplePower } from "./power";

/**
 * Power and register of every row of a segment, each with the fluid that filled the loop then: the
 * loop's own, or the one that somebody recorded for a stretch of it. Steps between rows of two fluids
 * stay steps.
 */
export function segmentPower(segment: ReadingSegment, options: PowerOptions): SamplePower {
  if (!segment.fluids || segment.fluids.length === 0) return samplePower(segment.columns, options);
  const count = segment.columns.instantMs.length;
  const powerKw = new Float64Array(count);
  const register = new Uint8Array(count);
  let meterOnly: Uint8Array | null = null;
  for (const { from, to, fluid } of fluidRows(segment, options.fluid)) {
    const part = samplePower(slice(segment.columns, from, to), { ...options, fluid });
    powerKw.set(part.powerKw, from);
    register.set(part.register, from);
    if (part.meterOnly === null) continue;
    meterOnly ??= new Uint8Array(count);
    meterOnly.set(part.meterOnly, from);
  }
  return { powerKw, register, meterOnly };
}

function slice(columns: ReadingColumns, from: number, to: number): ReadingColumns {
  return {
    instantMs: columns.instantMs.subarray(from, to),
    quality: columns.quality.subarray(from, to),
    ...mapChannels(columns, (values) => values.subarray(from, to)),
  };
}
