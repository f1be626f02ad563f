import { flowAtVelocityM3PerHour } from "../pipes/bore";
import { M_PER_S_PER, toM3 } from "../units/size-and-pressure";
import type { SeriesKind } from "../readings/reading-columns";
import { newTally, tally, type Tally } from "./raw-rows";
import type { CountedVolumeUnit, VelocityUnit } from "./recipe";

/** A point's bore over a time; the instants are UTC ms, `toMs` null until now. */
export interface BoreSpan {
  readonly fromMs: number;
  readonly toMs: number | null;
  readonly insideDiameterMm: number;
}

const MS_PER_HOUR = 3_600_000;
/** A row after a longer step may hold pulses of rows that are missing, or may not. */
const LONGEST_STEPS = 1.5;

/**
 * The bore that holds at an instant: the version of that time, else the first one, because a point is
 * often entered after its log was written.
 * @param bores by ascending time; null where the point has none
 */
export function boreAtMm(bores: readonly BoreSpan[], instantMs: number): number | null {
  const at = bores.find(
    ({ fromMs, toMs }) => instantMs >= fromMs && (toMs === null || instantMs < toMs),
  );
  const earlier = bores.filter(({ fromMs }) => fromMs <= instantMs);
  return (at ?? earlier.at(-1) ?? bores[0])?.insideDiameterMm ?? null;
}

export interface DerivedFlow {
  /** m³/h, one a row; NaN where unknown. */
  readonly flowM3PerHour: Float64Array;
  /** Rows by the bore used, or by the pulse's worth. */
  readonly made: Tally;
  /** Rows whose pulses speak for a time that is not known. */
  readonly opening: Tally;
}

interface Rows {
  readonly instantMs: Float64Array;
  readonly line: Uint32Array;
}

/**
 * Flow from water speed: q = v·π·d²/4, d the point's bore at the row's time. Null without a bore.
 * Example: 1 m/s in 102.26 mm is 29.5668 m³/h.
 */
export function flowFromVelocity(
  { instantMs, line }: Rows,
  velocity: Float64Array,
  unit: VelocityUnit,
  bores: readonly BoreSpan[],
): DerivedFlow | null {
  if (bores.length === 0) return null;
  const made = newTally();
  const flowM3PerHour = velocity.map((value, i) => {
    const bore = boreAtMm(bores, instantMs[i] as number);
    if (bore === null || Number.isNaN(value)) return NaN;
    tally(made, `${bore} mm`, () => exampleOf(line, instantMs, i, `${value} ${unit}`));
    return flowAtVelocityM3PerHour(value * M_PER_S_PER[unit], bore);
  });
  return { flowM3PerHour, made, opening: newTally() };
}

/** What one pulse stands for. */
export interface PulseWorth {
  readonly value: number;
  readonly unit: CountedVolumeUnit;
}

/**
 * Mean flow from pulses counted in each row's step: volume ÷ step. The step ends at the label unless
 * `kind` says that it starts there. The row at the log's open end, and one after a gap, speak for a
 * time nobody knows: they give no flow and are listed, so that no pulse is lost unseen.
 * Example: 12 pulses of 10 L in a quarter of an hour are 0.12 m³, so 0.48 m³/h.
 */
export function flowFromPulses(
  { instantMs, line }: Rows,
  pulses: Float64Array,
  worth: PulseWorth,
  nominalStepMs: number | null,
  kind: SeriesKind,
): DerivedFlow {
  const made = newTally();
  const opening = newTally();
  const longestMs = LONGEST_STEPS * (nominalStepMs ?? 0);
  const flowM3PerHour = pulses.map((count, i) => {
    if (Number.isNaN(count)) return NaN;
    const [from, to] = kind === "meanFromLabel" ? [i, i + 1] : [i - 1, i];
    const stepMs = (instantMs[to] ?? NaN) - (instantMs[from] ?? NaN);
    if (!(stepMs <= longestMs)) {
      const kindOfRow = Number.isNaN(stepMs)
        ? kind === "meanFromLabel"
          ? "last"
          : "first"
        : "gap";
      tally(opening, kindOfRow, () => exampleOf(line, instantMs, i, String(count)));
      return NaN;
    }
    tally(made, `${worth.value} ${worth.unit}`, () => exampleOf(line, instantMs, i, String(count)));
    return toM3(count * worth.value, worth.unit) / (stepMs / MS_PER_HOUR);
  });
  return { flowM3PerHour, made, opening };
}

function exampleOf(line: Uint32Array, instantMs: Float64Array, row: number, cell: string) {
  return {
    line: line[row] as number,
    column: null,
    cell,
    instantMs: instantMs[row] as number,
  };
}
