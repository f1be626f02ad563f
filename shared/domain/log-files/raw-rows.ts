import type { ColumnUnit } from "./recipe";
import type { RowExample } from "./repair-step";

/** The columns of a file that energy or its quality needs. */
export type ChannelMeaning =
  | "flow"
  | "supply"
  | "return"
  | "signal"
  | "power"
  | "volumeCounter"
  | "heatingCounter"
  | "coolingCounter"
  | "velocity"
  | "pulses"
  | "status"
  | "outdoor"
  | "electricPower"
  | "pressure";

/** One channel as the file has it: original unit, original decimals, file order; NaN where no number stands. */
export interface RawChannel {
  readonly meaning: ChannelMeaning;
  readonly columnIndex: number;
  readonly header: string;
  /** Null while somebody still has to say. */
  readonly unit: ColumnUnit | null;
  /** Most digits after the decimal mark in any cell: values × 10^decimals are whole. */
  readonly decimals: number;
  readonly values: Float64Array;
  /** Only of a status column: its words, whose places in this list are the values. */
  readonly words?: readonly string[];
}

/** Cells or rows of one kind: all counted, a few shown. */
export interface Tally {
  count: number;
  readonly examples: RowExample[];
  readonly countByKind: Record<string, number>;
}

export type RowProblemCode =
  "unreadableCell" | "unreadableTime" | "shortRow" | "longRow" | "oversizeRow";

/** What a person can do about it; translated on screen. */
export type RemedyCode =
  "checkDecimalMark" | "checkTimeFormat" | "checkSeparator" | "correctInFile";

/** One cell or row that could not be read, with its place and what would help. */
export interface RowProblem {
  readonly code: RowProblemCode;
  /** 1-based line in the file. */
  readonly line: number;
  /** 0-based; null where the whole row is meant. */
  readonly columnIndex: number | null;
  readonly column: string | null;
  /** As written, at most 60 characters. */
  readonly cell: string | null;
  readonly remedy: RemedyCode;
}

/** A problem as it is met, and besides: cells with a word for "no reading", and lines of a footer. */
export interface ReadProblem {
  readonly code: RowProblemCode | "noReadingWord" | "emptyCell" | "footer";
  readonly line: number;
  readonly columnIndex: number | null;
  readonly column: string | null;
  readonly cell: string | null;
}

/** The rows of one file in file order, nothing repaired yet. Rows whose time cannot be read are in the tallies only. */
export interface RawRows {
  readonly rowCount: number;
  /** 1-based line of each row in the file. */
  readonly line: Uint32Array;
  /** UTC ms where `isUtc`, else the wall clock's fields as if they were UTC. */
  readonly timeMs: Float64Array;
  /** 1 where the cell carried its own offset or the format is an epoch. */
  readonly isUtc: Uint8Array;
  readonly channels: readonly RawChannel[];
  /** The first {@link MAX_PROBLEMS}; `problemCount` counts all. */
  readonly problems: readonly RowProblem[];
  readonly problemCount: number;
  readonly unreadableCells: Tally;
  readonly unreadableTimes: Tally;
  readonly shortRows: Tally;
  /** Cells with a word for "no reading", by word; "" counts empty cells. */
  readonly tokens: Tally;
  /** Lines after the last row. */
  readonly footer: Tally;
}

export const MAX_PROBLEMS = 1000;
export const MAX_EXAMPLES = 20;
/** Different words counted one by one; further ones are counted together as "…". */
const MAX_KINDS = 40;

export function newTally(): Tally {
  return { count: 0, examples: [], countByKind: {} };
}

/** @param example made only while examples are still wanted */
export function tally(into: Tally, kind: string, example: () => RowExample): void {
  into.count++;
  const kinds = into.countByKind;
  const known = Object.prototype.hasOwnProperty.call(kinds, kind);
  const key = known || Object.keys(kinds).length < MAX_KINDS ? kind : "…";
  kinds[key] = (Object.prototype.hasOwnProperty.call(kinds, key) ? (kinds[key] as number) : 0) + 1;
  if (into.examples.length < MAX_EXAMPLES) into.examples.push(example());
}
