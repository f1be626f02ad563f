import type { UnpackCode } from "./containers";
import type { ColumnMeaning, ColumnUnit, FileRecipe, FlowUnit } from "./recipe";

/** What recognition found in a file: a proposed recipe, the proof of each guess, and what it must ask. */
export interface Recognition {
  readonly recipe: FileRecipe;
  /** One entry a guess, in the order a person would check them. */
  readonly proofs: readonly Proof[];
  /** What nothing in the file proves. The import waits for every answer. */
  readonly questions: readonly Question[];
  /** First lines as written, decoded, for the File step. */
  readonly firstLines: readonly string[];
  /** Rows from across the file, cells as written, for the Columns step. */
  readonly sampleRows: readonly SampleRow[];
  readonly dataRowCount: number;
  readonly columnCount: number;
  /** Words of columns that hold words, by column; for choosing which mean a bad reading. */
  readonly words?: readonly {
    readonly columnIndex: number;
    readonly counts: Readonly<Record<string, number>>;
  }[];
  /** Two sets of columns or more, each of another metering point. */
  readonly pointSets?: readonly PointSet[];
  /** Serial number, interval and the like that the lines above the header name. */
  readonly preamble: readonly {
    readonly line: number;
    readonly label: string;
    readonly value: string;
  }[];
}

export interface SampleRow {
  readonly line: number;
  readonly cells: readonly string[];
}

export interface Proof {
  readonly about:
    | "encoding"
    | "separator"
    | "headerLine"
    | "unitsLine"
    | "decimalMark"
    | "dateOrder"
    | "columnMeaning"
    | "columnUnit"
    | "seriesKind"
    | "century";
  readonly columnIndex: number | null;
  /** 1-based line of the row that proves it, with the cell that does; null where the whole file speaks. */
  readonly line: number | null;
  readonly cell: string | null;
  readonly certainty: "proved" | "likely";
}

export type Question =
  | {
      readonly code: "dateOrder";
      readonly choices: readonly ("dayMonthYear" | "monthDayYear" | "yearMonthDay")[];
      readonly firstCell: string;
      readonly lastCell: string;
      /** Typical step in seconds under each choice, in the order of `choices`, so that a person can see which is likely. */
      readonly stepSeconds: readonly (number | null)[];
    }
  | {
      readonly code: "flowUnit";
      readonly columnIndex: number;
      readonly minValue: number;
      readonly maxValue: number;
      readonly choices: readonly FlowUnit[];
    }
  | {
      readonly code: "temperatureUnit";
      readonly columnIndex: number;
      readonly minValue: number;
      readonly maxValue: number;
    }
  | {
      readonly code: "decimalMark";
      readonly columnIndex: number;
      readonly cell: string;
      readonly line: number;
    }
  | { readonly code: "columnMeaning"; readonly meaning: ColumnMeaning }
  /** The unit of a meter's power or counter. */
  | {
      readonly code: "columnUnit";
      readonly columnIndex: number;
      readonly minValue: number;
      readonly maxValue: number;
      readonly choices: readonly ColumnUnit[];
    }
  /** A header says that rows are means and not of which step. */
  | { readonly code: "seriesKind"; readonly columnIndex: number; readonly header: string }
  /** A meter's power in a changeover loop: which heat is the positive one. */
  | {
      readonly code: "positivePower";
      readonly columnIndex: number;
      readonly minValue: number;
      readonly maxValue: number;
    }
  /** What one pulse of a column stands for: no file proves it. */
  | {
      readonly code: "pulseValue";
      readonly columnIndex: number;
      readonly minValue: number;
      readonly maxValue: number;
    }
  /** Which words of a status column mean a bad reading. */
  | {
      readonly code: "statusWords";
      readonly columnIndex: number;
      readonly words: readonly StatusWord[];
    }
  /** Two columns of the same quantity that nothing tells apart, such as two headed "T". */
  | {
      readonly code: "alikeColumns";
      readonly columnIndexes: readonly number[];
      readonly meanings: readonly ColumnMeaning[];
    }
  /** Several sets of columns, and which is this point's. */
  | { readonly code: "whichSet"; readonly sets: readonly PointSet[] }
  /** Water speed is flow only with the pipe's bore, and the point has none. */
  | { readonly code: "pointBore"; readonly columnIndex: number }
  | { readonly code: "loggerClock" };

/** A word of a status column, how often it stands there, and what it usually means. */
export interface StatusWord {
  readonly word: string;
  readonly count: number;
  readonly likely: "bad" | "good" | null;
}

/** Columns of one of several metering points in a file. */
export interface PointSet {
  /** What their headers have in common and the other sets' have not; "" where nothing. */
  readonly name: string;
  /** 0-based columns with the meaning and unit each has for that point. */
  readonly columns: readonly SetColumn[];
}

export interface SetColumn {
  readonly index: number;
  readonly meaning: ColumnMeaning;
  readonly unit: ColumnUnit | null;
}

/** Why a file cannot be read at all. `remedy` codes are translated on screen. */
export interface Unreadable {
  readonly code:
    | "empty"
    | "notText"
    | "noTimes"
    | "noRows"
    | "tooManyColumns"
    /** A comma file with more cells than headers: decimal commas cut its numbers in two. */
    | "columnsDoNotMatchHeader"
    /** Hours run 12, 1, 2 … twice a day and nothing tells morning from afternoon. */
    | "halfDayUnknown"
    | UnpackCode;
  readonly line: number | null;
  readonly cell: string | null;
}
