import { newTally, tally, type RawRows, type Tally } from "./raw-rows";
import type { RepairChoices } from "./recipe";

export interface OrderedRows {
  /** Rows to keep, as indices into the raw rows, instants strictly ascending; null means all rows as they are. */
  readonly order: Uint32Array | null;
  readonly outOfOrder: Tally;
  readonly identicalRepeats: Tally;
  readonly conflictingRepeats: Tally;
}

type Choices = Pick<RepairChoices, "outOfOrder" | "identicalRepeats" | "conflictingRepeats">;

/** Rows standing back this many or more in one go are a block, e.g. a second download, rather than stragglers. */
const BLOCK_ROWS = 10;

/**
 * Brings the rows into the order of their instants and settles instants that occur more than once.
 * Rows with a NaN instant are left out. An undecided conflict is counted and provisionally keeps the first.
 */
export function orderRows(raw: RawRows, instantMs: Float64Array, choices: Choices): OrderedRows {
  const outOfOrder = newTally();
  const identicalRepeats = newTally();
  const conflictingRepeats = newTally();
  const result = { outOfOrder, identicalRepeats, conflictingRepeats };
  if (isStrictlyAscending(instantMs)) return { ...result, order: null };
  const sorted = sortRows(raw, instantMs, choices.outOfOrder, outOfOrder);
  const order = settleRepeats(
    raw,
    instantMs,
    sorted,
    choices,
    identicalRepeats,
    conflictingRepeats,
  );
  return { ...result, order };
}

function isStrictlyAscending(instantMs: Float64Array): boolean {
  let previous = -Infinity;
  for (let i = 0; i < instantMs.length; i++) {
    const at = instantMs[i] as number;
    // Also false for NaN.
    if (!(at > previous)) return false;
    previous = at;
  }
  return true;
}

/** Stable: rows with one instant stay in file order. Costs little when few rows are out of order. */
function sortRows(
  raw: RawRows,
  instantMs: Float64Array,
  choice: Choices["outOfOrder"],
  outOfOrder: Tally,
): Uint32Array {
  const onTime = new Uint32Array(instantMs.length);
  let onTimeCount = 0;
  const late: number[] = [];
  let latest = -Infinity;
  let run = 0;
  const closeRun = (): void => {
    if (run > 0) {
      const kind = run >= BLOCK_ROWS ? "block" : "single";
      outOfOrder.countByKind[kind] = (outOfOrder.countByKind[kind] ?? 0) + run;
    }
    run = 0;
  };
  for (let i = 0; i < instantMs.length; i++) {
    const at = instantMs[i] as number;
    if (Number.isNaN(at)) continue;
    if (at >= latest) {
      closeRun();
      latest = at;
      onTime[onTimeCount++] = i;
      continue;
    }
    run++;
    outOfOrder.count++;
    if (outOfOrder.examples.length < 20) {
      outOfOrder.examples.push({
        line: raw.line[i] as number,
        column: null,
        cell: null,
        instantMs: at,
      });
    }
    if (choice === "sort") late.push(i);
  }
  closeRun();
  const main = onTime.subarray(0, onTimeCount);
  if (late.length === 0) return main;
  late.sort((a, b) => (instantMs[a] as number) - (instantMs[b] as number) || a - b);
  return merge(main, Uint32Array.from(late), instantMs);
}

function merge(main: Uint32Array, late: Uint32Array, instantMs: Float64Array): Uint32Array {
  const out = new Uint32Array(main.length + late.length);
  let m = 0;
  let l = 0;
  for (let i = 0; i < out.length; i++) {
    const a = main[m];
    const b = late[l];
    const takeMain = b === undefined || (a !== undefined && comesFirst(a, b, instantMs));
    out[i] = takeMain ? (a as number) : (b as number);
    if (takeMain) m++;
    else l++;
  }
  return out;
}

function comesFirst(a: number, b: number, instantMs: Float64Array): boolean {
  const difference = (instantMs[a] as number) - (instantMs[b] as number);
  return difference < 0 || (difference === 0 && a < b);
}

function settleRepeats(
  raw: RawRows,
  instantMs: Float64Array,
  sorted: Uint32Array,
  choices: Choices,
  identical: Tally,
  conflicting: Tally,
): Uint32Array {
  // Of several rows at most one stays, so the list is never written ahead of where it is read.
  const kept = sorted;
  let count = 0;
  for (let from = 0; from < sorted.length;) {
    const at = instantMs[sorted[from] as number] as number;
    let to = from + 1;
    while (to < sorted.length && instantMs[sorted[to] as number] === at) to++;
    if (to === from + 1) {
      kept[count++] = sorted[from] as number;
    } else {
      const row = keptOfGroup(raw, sorted.subarray(from, to), at, choices, identical, conflicting);
      if (row !== null) kept[count++] = row;
    }
    from = to;
  }
  return kept.subarray(0, count);
}

/** Which row of several with one instant stays; null if none does. */
function keptOfGroup(
  raw: RawRows,
  group: Uint32Array,
  at: number,
  choices: Choices,
  identical: Tally,
  conflicting: Tally,
): number | null {
  const distinct: number[] = [];
  let repeats = 0;
  for (const row of group) {
    const show = () => ({ line: raw.line[row] as number, column: null, cell: null, instantMs: at });
    if (distinct.some((other) => sameReadings(raw, row, other))) {
      repeats++;
      tally(identical, choices.identicalRepeats, show);
    } else {
      distinct.push(row);
      if (distinct.length > 1) tally(conflicting, choices.conflictingRepeats ?? "undecided", show);
    }
  }
  if (repeats > 0 && choices.identicalRepeats === "leaveOutAll") return null;
  if (distinct.length === 1) return distinct[0] as number;
  if (choices.conflictingRepeats === "leaveOutAll") return null;
  return (
    choices.conflictingRepeats === "keepLast" ? distinct[distinct.length - 1] : distinct[0]
  ) as number;
}

/** Whether two rows hold the same readings in every channel; no reading equals no reading. */
export function sameReadings(raw: RawRows, a: number, b: number): boolean {
  return raw.channels.every(
    ({ values }) => Object.is(values[a], values[b]) || values[a] === values[b],
  );
}
