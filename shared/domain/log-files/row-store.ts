import type { ColumnRecipe, DecimalMark } from "./recipe";
import { WordList } from "./status-words";

/** One channel being read: its column of numbers grows with the store's rows. */
export class StoredChannel {
  /** Most digits after the mark so far. */
  decimals = 0;
  values: Float64Array;
  readonly index: number;
  readonly mark: DecimalMark;
  /** Of a status column: its values are places in this list. */
  readonly words: WordList | null;

  constructor(
    readonly column: ColumnRecipe,
    capacity: number,
  ) {
    this.index = column.index;
    this.mark = column.decimalMark;
    this.words = column.meaning === "status" ? new WordList(MOST_WORDS) : null;
    this.values = new Float64Array(capacity);
  }
}

/** Remarks that somebody takes for a status do not fill the memory. */
const MOST_WORDS = 1000;
const MIN_CAPACITY = 16;
const GROWTH = 1.6;

/** The columns a reader fills, all of one length; memory is taken once where the rows are known. */
export class RowStore {
  rowCount = 0;
  capacity: number;
  lines: Uint32Array;
  timeMs: Float64Array;
  isUtc: Uint8Array;
  readonly channels: readonly StoredChannel[];

  constructor(columns: readonly ColumnRecipe[], expectedRows: number) {
    const capacity = Math.max(MIN_CAPACITY, expectedRows);
    this.capacity = capacity;
    this.lines = new Uint32Array(capacity);
    this.timeMs = new Float64Array(capacity);
    this.isUtc = new Uint8Array(capacity);
    this.channels = columns.map((column) => new StoredChannel(column, capacity));
  }

  /** Makes room for more rows than were expected. */
  grow(): void {
    this.capacity = Math.ceil(this.capacity * GROWTH);
    this.lines = enlarge(this.lines, new Uint32Array(this.capacity));
    this.timeMs = enlarge(this.timeMs, new Float64Array(this.capacity));
    this.isUtc = enlarge(this.isUtc, new Uint8Array(this.capacity));
    for (const channel of this.channels) {
      channel.values = enlarge(channel.values, new Float64Array(this.capacity));
    }
  }
}

function enlarge<T extends Uint8Array | Uint32Array | Float64Array>(from: T, to: T): T {
  to.set(from);
  return to;
}
