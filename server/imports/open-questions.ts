import { openQuestions, unitQuestionOf } from "@shared/domain/log-files/open-questions";
import {
  FLOW_UNITS,
  isChannelMeaning,
  unitsOfMeaning,
} from "@shared/domain/log-files/column-units";
import { statusWordsOf } from "@shared/domain/log-files/status-words";
import { saysMean } from "@shared/domain/log-files/header-words";
import type { ColumnRecipe, FileRecipe } from "@shared/domain/log-files/recipe";
import type { LoopService } from "@shared/contracts/places";
import type { Question, Recognition, SampleRow } from "@shared/domain/log-files/recognition";

interface Findings {
  readonly asked: readonly Question[];
  readonly sampleRows: readonly SampleRow[];
  /** Words of columns that hold words; left out by findings of older files. */
  readonly words?: Recognition["words"];
}

/** What is known of the point beside its files. */
export interface AskedOfPoint {
  readonly service: LoopService;
  /** A pipe is entered, so that water speed gives flow. */
  readonly hasBore: boolean;
}

/**
 * What a recipe that somebody gave leaves open: the questions of recognition it does not answer and
 * those it raises itself, such as the unit of a column that was skipped before. Giving a recipe
 * answers what it states without a null: decimal marks and the columns' meanings.
 */
export function questionsLeftBy(
  recipe: FileRecipe,
  findings: Findings,
  { service, hasBore }: AskedOfPoint,
): Question[] {
  const left = findings.asked.filter(
    (question) =>
      isOpen(question, recipe) &&
      (question.code !== "positivePower" || service === "changeover") &&
      question.code !== "pointBore",
  );
  const has = (code: Question["code"], columnIndex?: number) =>
    left.some(
      (question) =>
        question.code === code &&
        (columnIndex === undefined ||
          ("columnIndex" in question && question.columnIndex === columnIndex)),
    );
  const raised = openQuestions(recipe).flatMap((open): Question[] => {
    if (open.code === "timeColumn")
      return has("columnMeaning") ? [] : [{ code: "columnMeaning", meaning: "time" }];
    if (open.code === "dateOrder") return has("dateOrder") ? [] : [dateOrderOf(recipe, findings)];
    if (has(open.code, open.columnIndex)) return [];
    if (open.code === "statusWords") {
      const words = wordsOf(findings, open.columnIndex);
      return [{ code: "statusWords", columnIndex: open.columnIndex, words }];
    }
    const range = rangeOf(recipe, open.columnIndex, findings.sampleRows);
    if (open.code === "pulseValue") return [{ ...open, code: "pulseValue", ...range }];
    if (open.code === "flowUnit")
      return [{ ...open, code: "flowUnit", ...range, choices: FLOW_UNITS }];
    if (open.code === "temperatureUnit") return [{ ...open, code: "temperatureUnit", ...range }];
    const meaning = recipe.columns.find(({ index }) => index === open.columnIndex)?.meaning;
    const choices = meaning === undefined ? [] : unitsOfMeaning(meaning);
    return [{ ...open, code: "columnUnit", ...range, choices }];
  });
  const power = recipe.columns.find(({ meaning }) => meaning === "power");
  if (power && service === "changeover" && !recipe.meter?.positivePower && !has("positivePower")) {
    const range = rangeOf(recipe, power.index, findings.sampleRows);
    raised.push({ code: "positivePower", columnIndex: power.index, ...range });
  }
  const velocity = recipe.columns.find(({ meaning }) => meaning === "velocity");
  if (velocity && !hasBore) raised.push({ code: "pointBore", columnIndex: velocity.index });
  return [...left, ...raised];
}

/** The words of a column over the whole file, or over the rows shown where it was not taken for words. */
function wordsOf({ words, sampleRows }: Findings, columnIndex: number) {
  const found = words?.find((column) => column.columnIndex === columnIndex)?.counts;
  if (found) return statusWordsOf(found);
  const counts: Record<string, number> = {};
  for (const { cells } of sampleRows) {
    const word = (cells[columnIndex] ?? "").trim();
    counts[word] = (counts[word] ?? 0) + 1;
  }
  return statusWordsOf(counts);
}

function isOpen(question: Question, recipe: FileRecipe): boolean {
  switch (question.code) {
    case "dateOrder":
      return recipe.time.format.kind === "calendar" && recipe.time.format.order === null;
    case "loggerClock":
      return recipe.time.clock === null;
    case "decimalMark":
    case "columnMeaning":
      return false;
    case "pointBore":
      return recipe.columns.some(({ meaning }) => meaning === "velocity");
    case "pulseValue":
    case "statusWords": {
      const wanted = question.code === "pulseValue" ? "pulses" : "status";
      const column = recipe.columns.find(({ index }) => index === question.columnIndex);
      if (column?.meaning !== wanted) return false;
      if (wanted === "status") return column.badWords === undefined;
      return column.unit === null || (column.pulseValue ?? null) === null;
    }
    case "alikeColumns":
      // Answered by reading one of them, or by leaving all of them out on purpose.
      return recipe.alikeChosen !== true && question.columnIndexes.every(isSkipped(recipe));
    case "whichSet":
      return question.sets.every(({ columns }) =>
        columns.map(({ index }) => index).every(isSkipped(recipe)),
      );
    case "seriesKind": {
      // Answered by any kind of mean, or by saying that moments are meant all the same.
      const column = recipe.columns.find(({ index }) => index === question.columnIndex);
      const isRead = column !== undefined && column.meaning !== "skip" && saysMean(column.header);
      return isRead && recipe.seriesKind === "instantaneous" && recipe.kindChosen !== true;
    }
    case "positivePower": {
      const column = recipe.columns.find(({ index }) => index === question.columnIndex);
      return column?.meaning === "power" && !recipe.meter?.positivePower;
    }
    case "flowUnit":
    case "temperatureUnit":
    case "columnUnit": {
      const column = recipe.columns.find(({ index }) => index === question.columnIndex);
      if (column === undefined || column.unit !== null || !isChannelMeaning(column.meaning))
        return false;
      return unitQuestionOf(column.meaning) === question.code;
    }
  }
}

function isSkipped(recipe: FileRecipe) {
  return (columnIndex: number) =>
    recipe.columns.find(({ index }) => index === columnIndex)?.meaning === "skip";
}

function dateOrderOf(recipe: FileRecipe, { sampleRows }: Findings): Question {
  const index = recipe.columns.find(
    ({ meaning }) => meaning === "time" || meaning === "date",
  )?.index;
  const cell = (row: SampleRow | undefined) =>
    index === undefined ? "" : (row?.cells[index] ?? "");
  return {
    code: "dateOrder",
    choices: ["dayMonthYear", "monthDayYear", "yearMonthDay"],
    firstCell: cell(sampleRows[0]),
    lastCell: cell(sampleRows.at(-1)),
    stepSeconds: [null, null, null],
  };
}

/** From the few rows that are shown: enough to tell 12 L/s from 190 gpm. */
function rangeOf(recipe: FileRecipe, index: number, rows: readonly SampleRow[]) {
  const column = recipe.columns.find((other) => other.index === index);
  const values = rows.flatMap((row) => numberIn(row.cells[index], column) ?? []);
  return values.length === 0
    ? { minValue: 0, maxValue: 0 }
    : { minValue: Math.min(...values), maxValue: Math.max(...values) };
}

function numberIn(cell: string | undefined, column: ColumnRecipe | undefined): number | null {
  if (cell === undefined || cell.trim() === "") return null;
  const plain = column?.decimalMark === "," ? cell.replace(/\./g, "").replace(",", ".") : cell;
  const value = Number(plain.replace(/[\s']/g, ""));
  return Number.isFinite(value) ? value : null;
}
