import { blankSentinels } from "./clean-values";
import { createLogReader, type LogReader } from "./log-reader";
import { orderRows, sameReadings } from "./order-rows";
import type { RawRows, ReadProblem } from "./raw-rows";
import type { FileRecipe, RepairChoices } from "./recipe";
import { resolveTimes } from "./resolve-times";

/** Why a row, or a cell of one, is not read as it stands or does not count. */
export type ProblemReason =
  | ReadProblem["code"]
  | "noReadingNumber"
  | "identicalRepeat"
  | "conflictingRepeat"
  | "outOfOrder"
  | "missingHour"
  | "weakSignal"
  | "badStatus";

export interface ProblemRow {
  /** 1-based line in the file. */
  readonly line: number;
  readonly reason: ProblemReason;
  /** 0-based; null where the whole row is meant. */
  readonly columnIndex: number | null;
  readonly column: string | null;
  readonly cell: string | null;
}

export interface ProblemRows {
  /** By line, at most as many as asked for. */
  readonly rows: readonly ProblemRow[];
  /** All there are, those beyond `rows` as well. */
  readonly count: number;
}

/** Keeps the first few of what it is given and counts all. */
class Collector {
  readonly rows: ProblemRow[] = [];
  count = 0;

  constructor(private readonly most: number) {}

  readonly add = (row: ProblemRow): void => {
    this.count++;
    if (this.rows.length < this.most) this.rows.push(row);
  };
}

export interface ProblemReader extends Pick<LogReader, "push"> {
  end(choices: RepairChoices, siteZone: string): ProblemRows;
}

/**
 * Reads a file once more and lists every row that could not be read, was left out or does not count,
 * with the cell and the reason: all of them, where the checks keep a few examples of each.
 *
 * @param most rows to list; memory grows with it, not with the problems of the file
 */
export function createProblemReader(
  recipe: FileRecipe,
  most: number,
  expectedRows?: number,
): ProblemReader {
  const read = new Collector(most);
  const reader = createLogReader(recipe, {
    expectedRows,
    onProblem: ({ code, ...place }) => read.add({ reason: code, ...place }),
  });
  return {
    push: (bytes) => reader.push(bytes),
    end(choices, siteZone) {
      const left = new Collector(most);
      addResolved(reader.end(), recipe, choices, siteZone, left);
      const rows = [...read.rows, ...left.rows].sort((a, b) => a.line - b.line);
      return { rows: rows.slice(0, most), count: read.count + left.count };
    },
  };
}

/** What reading by itself does not tell: repeats, order, hours that never were, words as numbers. */
function addResolved(
  raw: RawRows,
  recipe: FileRecipe,
  choices: RepairChoices,
  siteZone: string,
  into: Collector,
): void {
  const times = resolveTimes(raw, recipe.time.clock, choices.missingHour, siteZone);
  const instantMs = times?.instantMs ?? new Float64Array(raw.rowCount).fill(NaN);
  const blanked = blankSentinels(raw, instantMs, choices.sentinels).values;
  // Without a clock nobody knows yet which rows repeat or stand out of order.
  const leftOut = times === null ? () => null : leftOutRows(raw, instantMs, choices);
  const excluded = excludedRows(raw, recipe, choices);
  for (let row = 0; row < raw.rowCount; row++) {
    const line = raw.line[row] as number;
    raw.channels.forEach(({ values, columnIndex, header }, k) => {
      const written = values[row] as number;
      if (Number.isNaN(written) || !Number.isNaN(blanked[k]?.[row])) return;
      const place = { columnIndex, column: header, cell: String(written) };
      into.add({ line, reason: "noReadingNumber", ...place });
    });
    const whole = { line, columnIndex: null, column: null, cell: null };
    const reason = leftOut(row);
    if (reason !== null) into.add({ ...whole, reason });
    else {
      const why = excluded(row);
      if (why !== null) into.add({ line, ...why });
    }
  }
}

function leftOutRows(
  raw: RawRows,
  instantMs: Float64Array,
  choices: RepairChoices,
): (row: number) => ProblemReason | null {
  const { order } = orderRows(raw, instantMs, choices);
  if (order === null) return () => null;
  const isKept = new Uint8Array(raw.rowCount);
  for (const row of order) isKept[row] = 1;
  const isLate = new Uint8Array(raw.rowCount);
  let latest = -Infinity;
  for (let row = 0; row < raw.rowCount; row++) {
    const at = instantMs[row] as number;
    if (at < latest) isLate[row] = 1;
    else if (at >= latest) latest = at;
  }
  const twins = rowsByInstant(instantMs, isKept);
  return (row) => {
    if (isKept[row] === 1) return null;
    const at = instantMs[row] as number;
    if (Number.isNaN(at)) return "missingHour";
    if (choices.outOfOrder === "leaveOut" && isLate[row] === 1) return "outOfOrder";
    const others = (twins.get(at) ?? []).filter((other) => other !== row);
    const isIdentical = others.some((other) => sameReadings(raw, row, other));
    return isIdentical ? "identicalRepeat" : "conflictingRepeat";
  };
}

/** Rows that share an instant with one that is left out. */
function rowsByInstant(instantMs: Float64Array, isKept: Uint8Array): Map<number, number[]> {
  const found = new Map<number, number[]>();
  for (let row = 0; row < instantMs.length; row++) {
    const at = instantMs[row] as number;
    if (isKept[row] === 0 && !Number.isNaN(at)) found.set(at, []);
  }
  for (let row = 0; row < instantMs.length; row++) found.get(instantMs[row] as number)?.push(row);
  return found;
}

/** Rows that are stored and do not count. */
function excludedRows(
  raw: RawRows,
  recipe: FileRecipe,
  choices: RepairChoices,
): (row: number) => Omit<ProblemRow, "line"> | null {
  const signal = raw.channels.find(({ meaning }) => meaning === "signal");
  const status = raw.channels.find(({ meaning }) => meaning === "status");
  const badWords = recipe.columns.find(({ index }) => index === status?.columnIndex)?.badWords;
  return (row) => {
    const strength = signal?.values[row] ?? NaN;
    if (signal && choices.weakSignal === "exclude" && strength < choices.weakSignalBelowPercent) {
      const { columnIndex, header: column } = signal;
      return { reason: "weakSignal", columnIndex, column, cell: String(strength) };
    }
    const word = status?.words?.[status.values[row] ?? -1];
    if (status && word !== undefined && badWords?.includes(word)) {
      const { columnIndex, header: column } = status;
      return { reason: "badStatus", columnIndex, column, cell: word };
    }
    return null;
  };
}
