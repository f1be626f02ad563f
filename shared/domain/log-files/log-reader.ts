import { isChannelMeaning } from "./column-units";
import { CellStatus, NumberCell } from "./number-cell";
import { MAX_PROBLEMS, newTally, tally } from "./raw-rows";
import type {
  ChannelMeaning,
  RawRows,
  ReadProblem,
  RemedyCode,
  RowProblem,
  RowProblemCode,
} from "./raw-rows";
import { PlainRows } from "./plain-rows";
import type { ColumnRecipe, FileRecipe } from "./recipe";
import type { RowExample } from "./repair-step";
import { RowStore, type StoredChannel } from "./row-store";
import { createRowStream } from "./row-stream";
import { MAX_CELLS, RowTokeniser } from "./row-tokeniser";
import { createTimeReader } from "./time-reader";

export interface LogReaderContext {
  /** Rows the file is known to have, from recognition: memory is then taken once. */
  readonly expectedRows?: number;
  /** Told of every problem, where the rows keep the first thousand. */
  readonly onProblem?: (problem: ReadProblem) => void;
}

/** Takes the bytes of a file in order, in chunks of any size. */
export interface LogReader {
  readonly rowsRead: number;
  push(bytes: Uint8Array): void;
  end(): RawRows;
}

/**
 * Reads a file by its recipe: bytes to columns, no string per cell, memory flat at some 50 bytes a row.
 * Nothing is repaired here; what cannot be read is listed with its line and cell.
 * @throws Error for a recipe whose date order or time column is not settled: ask {@link openQuestions} first.
 */
export function createLogReader(recipe: FileRecipe, context: LogReaderContext = {}): LogReader {
  return new Reader(recipe, context.expectedRows ?? 4096, context.onProblem ?? null);
}

/** Lines after the last reading up to this many are a footer; more are rows that cannot be read. */
const MAX_FOOTER_LINES = 20;
const MAX_CELL_CHARACTERS = 60;

interface PendingLine {
  readonly line: number;
  readonly cell: string;
}

class Reader implements LogReader {
  private readonly tokeniser: RowTokeniser;
  private readonly stream;
  private readonly time;
  private readonly number = new NumberCell();
  private readonly store: RowStore;
  private readonly plainRows: PlainRows | null;
  private readonly firstDataLine: number;
  private readonly columnCount: number;
  private readonly problems: RowProblem[] = [];
  private problemCount = 0;
  private readonly unreadableCells = newTally();
  private readonly unreadableTimes = newTally();
  private readonly shortRows = newTally();
  private readonly tokens = newTally();
  /** Lines without a time since the last row: a footer if no row follows. */
  private pending: PendingLine[] = [];

  constructor(
    private readonly recipe: FileRecipe,
    expectedRows: number,
    private readonly onProblem: ((problem: ReadProblem) => void) | null,
  ) {
    this.firstDataLine = recipe.dialect.firstDataLine;
    this.time = createTimeReader(recipe);
    this.store = new RowStore(
      recipe.columns.filter(({ meaning }) => isChannelMeaning(meaning)),
      expectedRows,
    );
    this.columnCount = recipe.columns.reduce((most, column) => Math.max(most, column.index + 1), 0);
    this.plainRows = PlainRows.suits(recipe) ? new PlainRows(recipe, this.store) : null;
    this.tokeniser = new RowTokeniser(recipe.dialect, (row) => this.readRow(row), this.plainRows);
    this.stream = createRowStream(recipe.dialect);
  }

  get rowsRead(): number {
    return this.store.rowCount;
  }

  push(bytes: Uint8Array): void {
    this.tokeniser.push(this.stream.convert(bytes));
  }

  end(): RawRows {
    this.tokeniser.push(this.stream.finish());
    this.tokeniser.end();
    const { rowCount, lines, timeMs, isUtc, channels } = this.store;
    const footer = newTally();
    // A last line that begins like a time is a row cut off or damaged, not a footer.
    const last = this.pending;
    this.pending = last.filter(({ cell }) => startsWithDigit(cell));
    this.flushPending();
    for (const { line, cell } of last) {
      if (startsWithDigit(cell)) continue;
      tally(footer, "", () => example(line, null, cell));
      this.onProblem?.({ code: "footer", line, columnIndex: null, column: null, cell });
    }
    return {
      rowCount,
      line: lines.subarray(0, rowCount),
      timeMs: timeMs.subarray(0, rowCount),
      isUtc: isUtc.subarray(0, rowCount),
      channels: channels.map(({ column, decimals, values, words }) => ({
        meaning: column.meaning as ChannelMeaning,
        columnIndex: column.index,
        header: column.header,
        unit: column.unit,
        decimals,
        values: values.subarray(0, rowCount),
        ...(words && { words: words.words }),
      })),
      problems: this.problems,
      problemCount: this.problemCount,
      unreadableCells: this.unreadableCells,
      unreadableTimes: this.unreadableTimes,
      shortRows: this.shortRows,
      tokens: this.tokens,
      footer,
    };
  }

  private readRow(row: RowTokeniser): void {
    if (row.line < this.firstDataLine) return;
    const { time } = this;
    if (row.cellCount < time.neededCells || !time.read(row)) {
      this.keepPending(row);
      return;
    }
    if (this.pending.length > 0) this.flushPending();
    if (row.cellCount > this.columnCount && this.hasExtraCells(row)) {
      // A stray separator has moved every cell after it: none of them can be trusted.
      this.addRowProblem("longRow", row);
      return;
    }
    const { store, number } = this;
    const at = store.rowCount++;
    if (at === store.capacity) store.grow();
    store.isUtc[at] = time.isUtc ? 1 : 0;
    store.lines[at] = row.line;
    store.timeMs[at] = time.ms;
    if (this.plainRows !== null) time.teach(row, this.plainRows);
    const { channels } = store;
    const { cellCount, buffer, starts, ends } = row;
    let isShort = false;
    for (let k = 0; k < channels.length; k++) {
      const channel = channels[k] as StoredChannel;
      const { index } = channel;
      channel.values[at] = NaN;
      if (index >= cellCount) {
        isShort = true;
        continue;
      }
      if (channel.words !== null) {
        channel.values[at] = channel.words.add(
          buffer,
          starts[index] as number,
          ends[index] as number,
        );
        continue;
      }
      const status = number.parse(
        buffer,
        starts[index] as number,
        ends[index] as number,
        channel.mark,
      );
      if (status === CellStatus.number) {
        channel.values[at] = number.value;
        if (number.decimals > channel.decimals) channel.decimals = number.decimals;
      } else this.addCell(row, channel, status);
    }
    if (isShort) this.addRowProblem("shortRow", row);
  }

  private hasExtraCells(row: RowTokeniser): boolean {
    if (row.cellCount > MAX_CELLS) return true;
    for (let i = this.columnCount; i < row.cellCount; i++) {
      if ((row.ends[i] as number) > (row.starts[i] as number)) return true;
    }
    return false;
  }

  private addCell(row: RowTokeniser, channel: StoredChannel, status: number): void {
    const { line } = row;
    const text = this.number.text.slice(0, MAX_CELL_CHARACTERS);
    const show = (): RowExample => example(line, channel.column.header, text);
    if (status !== CellStatus.unreadable) {
      tally(this.tokens, text, show);
      const { index: columnIndex, header: column } = channel.column;
      const code = text === "" ? "emptyCell" : "noReadingWord";
      this.onProblem?.({ code, line, columnIndex, column, cell: text });
      return;
    }
    tally(this.unreadableCells, channel.column.header, show);
    this.addProblem("unreadableCell", line, channel.column, text, "checkDecimalMark");
  }

  private addRowProblem(code: "shortRow" | "longRow" | "oversizeRow", row: RowTokeniser): void {
    const cell = row.cellText(this.time.columnIndex).slice(0, MAX_CELL_CHARACTERS);
    const { line } = row;
    tally(this.shortRows, code, () => example(line, null, cell));
    this.addProblem(
      code,
      line,
      null,
      cell,
      code === "longRow" ? "checkSeparator" : "correctInFile",
    );
  }

  private keepPending(row: RowTokeniser): void {
    if (row.oversize) {
      this.addRowProblem("oversizeRow", row);
      return;
    }
    // A broken time may still be part of the footer; only what follows can tell.
    if (this.plainRows !== null) this.plainRows.isAllowed = false;
    this.pending.push({
      line: row.line,
      cell: row
        .cellText(Math.min(this.time.columnIndex, row.cellCount - 1))
        .slice(0, MAX_CELL_CHARACTERS),
    });
    if (this.pending.length > MAX_FOOTER_LINES) this.flushPending();
  }

  private flushPending(): void {
    const column = this.recipe.columns.find(({ index }) => index === this.time.columnIndex) ?? null;
    for (const { line, cell } of this.pending) {
      tally(this.unreadableTimes, "", () => example(line, column?.header ?? null, cell));
      this.addProblem("unreadableTime", line, column, cell, "checkTimeFormat");
    }
    this.pending = [];
    if (this.plainRows !== null) this.plainRows.isAllowed = true;
  }

  private addProblem(
    code: RowProblemCode,
    line: number,
    column: ColumnRecipe | null,
    cell: string,
    remedy: RemedyCode,
  ): void {
    this.problemCount++;
    const place = { columnIndex: column?.index ?? null, column: column?.header ?? null };
    this.onProblem?.({ code, line, ...place, cell });
    if (this.problems.length >= MAX_PROBLEMS) return;
    this.problems.push({
      code,
      line,
      ...place,
      cell,
      remedy,
    });
  }
}

function startsWithDigit(cell: string): boolean {
  const first = cell[0] ?? "";
  return first >= "0" && first <= "9";
}

function example(line: number, column: string | null, cell: string): RowExample {
  return { line, column, cell, instantMs: null };
}
