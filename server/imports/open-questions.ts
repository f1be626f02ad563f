import { openQuestions } from "@shared/domain/log-files/open-questions";
import type { ColumnRecipe, FileRecipe, FlowUnit } from "@shared/domain/log-files/recipe";
import type { Question, SampleRow } from "@shared/domain/log-files/recognition";

const flowUnits: readonly FlowUnit[] = ["m3/h", "L/s", "L/min", "US gpm"];

interface Findings {
  readonly asked: readonly Question[];
  readonly sampleRows: readonly SampleRow[];
}

/**
 * What a recipe that somebody gave leaves open: the questions of recognition it does not answer and
 * those it raises itself, such as the unit of a column that was skipped before. Giving a recipe
 * answers what it states without a null: decimal marks and the columns' meanings.
 */
export function questionsLeftBy(recipe: FileRecipe, findings: Findings): Question[] {
  const left = findings.asked.filter((question) => isOpen(question, recipe));
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
    const range = rangeOf(recipe, open.columnIndex, findings.sampleRows);
    return open.code === "flowUnit"
      ? [{ ...open, code: "flowUnit", ...range, choices: flowUnits }]
      : [{ ...open, code: "temperatureUnit", ...range }];
  });
  return [...left, ...raised];
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
    case "flowUnit":
    case "temperatureUnit": {
      const column = recipe.columns.find(({ index }) => index === question.columnIndex);
      const meanings = question.code === "flowUnit" ? ["flow"] : ["supply", "return"];
      return column !== undefined && meanings.includes(column.meaning) && column.unit === null;
    }
  }
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
