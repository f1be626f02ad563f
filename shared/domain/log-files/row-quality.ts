import { RowQuality } from "../readings/reading-columns";
import { newTally, tally, type RawRows, type Tally } from "./raw-rows";
import type { FileRecipe, RepairChoices } from "./recipe";

export interface RowCounts {
  /** Rows of the file with a readable time. */
  readonly read: number;
  /** Rows that remain after all steps: measured + excluded + noReading. */
  readonly kept: number;
  readonly measured: number;
  readonly excluded: number;
  readonly noReading: number;
  /** Read but not kept: repeats, rows out of order, times that never were. */
  readonly leftOut: number;
  /** Rows the nominal step puts between the first and the last instant; null with fewer than two rows. */
  readonly expected: number | null;
  /** Expected but not in the file. */
  readonly missing: number | null;
}

/**
 * The quality of rows by what they lack: any of the water's channels the file has, unless a
 * permanent meter's power or counter is there; and in a file of a meter, that, unless the water's
 * three are all there.
 */
export function noReadings(
  count: number,
  water: readonly (Float64Array | null)[],
  meters: readonly (Float64Array | null)[],
): Uint8Array {
  const quality = new Uint8Array(count);
  const { noReading, measured } = RowQuality;
  const metered = meters.filter((channel) => channel !== null);
  for (const channel of water) {
    if (channel === null) {
      if (metered.length > 0) quality.fill(noReading);
      continue;
    }
    // NaN is the one value that differs from itself; asking Number costs four times as much.
    for (let i = 0; i < count; i++) if (channel[i] !== channel[i]) quality[i] = noReading;
  }
  for (const channel of metered)
    for (let i = 0; i < count; i++) if (channel[i] === channel[i]) quality[i] = measured;
  return quality;
}

/** Marks, and leaves out if so chosen, the rows whose signal is weaker than the limit. */
export function judgeRows(
  instantMs: Float64Array,
  line: Uint32Array,
  quality: Uint8Array,
  signalPercent: Float64Array | null,
  choices: RepairChoices,
): { quality: Uint8Array; weakSignal: Tally } {
  const weakSignal = newTally();
  if (signalPercent === null) return { quality, weakSignal };
  for (let i = 0; i < signalPercent.length; i++) {
    const signal = signalPercent[i] as number;
    if (!(signal < choices.weakSignalBelowPercent)) continue;
    tally(weakSignal, choices.weakSignal ?? "undecided", () => ({
      line: line[i] as number,
      column: null,
      cell: String(signal),
      instantMs: instantMs[i] as number,
    }));
    if (choices.weakSignal === "exclude" && quality[i] === RowQuality.measured)
      quality[i] = RowQuality.excluded;
  }
  return { quality, weakSignal };
}

/** What the rows of a file came to. */
export function countRows(
  read: number,
  instantMs: Float64Array,
  quality: Uint8Array,
  stepMs: number | null,
): RowCounts {
  const kept = instantMs.length;
  const codes = RowQuality;
  let excluded = 0;
  let noReading = 0;
  for (let i = 0; i < kept; i++) {
    if (quality[i] === codes.excluded) excluded++;
    else if (quality[i] === codes.noReading) noReading++;
  }
  const span = kept < 2 ? null : (instantMs[kept - 1] as number) - (instantMs[0] as number);
  const expected = span === null || stepMs === null ? null : Math.round(span / stepMs) + 1;
  const missing = expected === null ? null : Math.max(0, expected - kept);
  return {
    read,
    kept,
    measured: kept - excluded - noReading,
    excluded,
    noReading,
    leftOut: read - kept,
    expected,
    missing,
  };
}

/** Leaves out the measured rows whose status somebody has called bad, and counts them by their word. */
export function excludeBadStatus(
  raw: RawRows,
  recipe: FileRecipe,
  order: Uint32Array | null,
  { instantMs, line }: { readonly instantMs: Float64Array; readonly line: Uint32Array },
  quality: Uint8Array,
): Tally {
  const excluded = newTally();
  for (const { meaning, values, words, columnIndex, header } of raw.channels) {
    const bad = recipe.columns.find(({ index }) => index === columnIndex)?.badWords ?? [];
    if (meaning !== "status" || words === undefined || bad.length === 0) continue;
    for (let i = 0; i < quality.length; i++) {
      const word = words[values[order === null ? i : (order[i] as number)] as number] ?? "";
      if (!bad.includes(word)) continue;
      tally(excluded, word, () => ({
        line: line[i] as number,
        column: header,
        cell: word,
        instantMs: instantMs[i] as number,
      }));
      if (quality[i] === RowQuality.measured) quality[i] = RowQuality.excluded;
    }
  }
  return excluded;
}
