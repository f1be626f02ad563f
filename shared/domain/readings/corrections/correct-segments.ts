import type { ReadingSegment } from "../reading-columns";
import { sharedSpan, type CorrectionSpan } from "./correction-span";
import { exclude, type ExclusionRule } from "./exclude";
import { flipFlow } from "./flip-flow";
import { withFluid, type FluidSpan } from "./fluid-span";
import { otherSide, probeOffset, type Side } from "./probe-offset";
import { scaleFlow } from "./scale-by-bore";
import { splitSegments } from "./split-segments";
import { swapSides, type SwappedThing } from "./swap-sides";

/** A correction of a stretch of a point's readings. */
export type SegmentCorrection =
  | { readonly kind: "swapSides"; readonly span: CorrectionSpan; readonly swapped: SwappedThing }
  | {
      readonly kind: "probeOffset";
      /** The part of the correction's span in which the probe was recorded on `side`. */
      readonly span: CorrectionSpan;
      readonly side: Side;
      readonly addK: number;
    }
  | { readonly kind: "flipFlow"; readonly span: CorrectionSpan }
  | { readonly kind: "scaleByBore"; readonly span: CorrectionSpan; readonly factor: number }
  | {
      readonly kind: "exclude";
      readonly span: CorrectionSpan;
      readonly rule: ExclusionRule | null;
    }
  | { readonly kind: "fluid"; readonly span: FluidSpan }
  | { readonly kind: "split"; readonly atMs: number };

/**
 * Readings with a point's corrections on them. Stored readings never change: this is put on whenever
 * they are read, so a correction that is withdrawn leaves nothing behind.
 *
 * The order is fixed by kind, whenever each was applied, so that the same corrections always give the
 * same figures: a file's units, then its clock (both before files are merged), then here sides, probe
 * offsets, flow's direction, flow's size, exclusions (whose rules therefore see corrected values), and
 * the fluid, and last where segments are parted. A probe's offset goes with its readings: where probes turn out to have sat on the other
 * pipes than recorded, it lands on the other side too. Rows are never lost, added or moved.
 */
export function correctSegments(
  segments: readonly ReadingSegment[],
  corrections: readonly SegmentCorrection[],
): readonly ReadingSegment[] {
  if (corrections.length === 0) return segments;
  const offsets = corrections.flatMap((correction) =>
    correction.kind === "probeOffset" ? followProbe(correction, corrections) : [],
  );
  const steps: readonly ((segment: ReadingSegment) => ReadingSegment)[] = [
    ...of(corrections, "swapSides").map(
      ({ span, swapped }) =>
        (segment: ReadingSegment) =>
          swapSides(segment, span, swapped),
    ),
    ...offsets.map(
      ({ span, side, addK }) =>
        (segment: ReadingSegment) =>
          probeOffset(segment, span, side, addK),
    ),
    ...of(corrections, "flipFlow").map(
      ({ span }) =>
        (segment: ReadingSegment) =>
          flipFlow(segment, span),
    ),
    ...of(corrections, "scaleByBore").map(
      ({ span, factor }) =>
        (segment: ReadingSegment) =>
          scaleFlow(segment, span, factor),
    ),
    ...of(corrections, "exclude").map(
      ({ span, rule }) =>
        (segment: ReadingSegment) =>
          exclude(segment, span, rule),
    ),
    ...of(corrections, "fluid").map(
      ({ span }) =>
        (segment: ReadingSegment) =>
          withFluid(segment, span),
    ),
  ];
  const changed = segments.map((segment) => steps.reduce((done, step) => step(done), segment));
  return of(corrections, "split").reduce<readonly ReadingSegment[]>(
    (parts, { atMs }) => splitSegments(parts, atMs),
    changed,
  );
}

type Of<Kind extends SegmentCorrection["kind"]> = Extract<SegmentCorrection, { kind: Kind }>;

function of<Kind extends SegmentCorrection["kind"]>(
  corrections: readonly SegmentCorrection[],
  kind: Kind,
): Of<Kind>[] {
  return corrections.filter((correction): correction is Of<Kind> => correction.kind === kind);
}

/** An offset in the parts where its probe's readings end up on one side. */
function followProbe(
  offset: Of<"probeOffset">,
  corrections: readonly SegmentCorrection[],
): Of<"probeOffset">[] {
  const exchanges = of(corrections, "swapSides").filter(({ swapped }) => swapped === "probes");
  const edges = exchanges
    .flatMap(({ span }) => [span.startMs, span.endMs])
    .filter((ms) => ms > offset.span.startMs && ms < offset.span.endMs);
  const cuts = [
    ...new Set([offset.span.startMs, ...edges.sort((a, b) => a - b), offset.span.endMs]),
  ];
  return cuts.slice(1).map((endMs, i) => {
    const span = { startMs: cuts[i]!, endMs };
    const times = exchanges.filter((exchange) => sharedSpan(exchange.span, span) !== null).length;
    return { ...offset, span, side: times % 2 === 0 ? offset.side : otherSide(offset.side) };
  });
}
