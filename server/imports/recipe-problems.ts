import { isCounter, needsUnit, unitsOfMeaning } from "@shared/domain/log-files/column-units";
import type { DateOrder, FileRecipe } from "@shared/domain/log-files/recipe";
import type { FieldError } from "@server/http/errors";
import type { RecognitionFindings } from "@server/models/log-file";

/** What makes a recipe unusable: columns that contradict each other, dates that the file disproves. */
export function recipeProblems(recipe: FileRecipe, recognition: RecognitionFindings): FieldError[] {
  const { columnCount } = recognition;
  const problems: FieldError[] = [];
  const add = (path: string, code: string, message: string) =>
    problems.push({ pointer: `/body/${path}`, code, message });
  const seen = new Map<string, number>();
  recipe.columns.forEach((column, i) => {
    const at = `columns/${i}`;
    if (column.index >= columnCount)
      add(`${at}/index`, "no-such-column", `The file has ${columnCount} columns.`);
    if (column.meaning === "skip") return;
    if (seen.has(column.meaning))
      add(`${at}/meaning`, "twice", `Two columns cannot both be ${column.meaning}. Skip one.`);
    seen.set(column.meaning, i);
    const units: readonly string[] = unitsOfMeaning(column.meaning);
    if (column.unit !== null && !units.includes(column.unit))
      add(`${at}/unit`, "wrong-unit", `A ${column.meaning} column cannot be in ${column.unit}.`);
  });
  if (seen.has("time") && (seen.has("date") || seen.has("timeOfDay")))
    add("columns", "two-times", "Give either one time column or a date and a time of day.");
  const named = recipe.columns.map(({ meaning }) => meaning);
  if (!named.some(needsUnit))
    add("columns", "no-quantity", "Name at least a flow, a temperature, a power or a counter.");
  if (FLOWS.filter((meaning) => seen.has(meaning)).length > 1)
    add(
      "columns",
      "two-flows",
      "Give one of flow rate, water speed, pulses and volume counter. Skip the others.",
    );
  if (seen.has("pulses") && recipe.seriesKind === "instantaneous")
    add(
      "seriesKind",
      "pulses-have-a-step",
      "Pulses are counted over a step: say whether it ends or starts at the row's time.",
    );
  if (seen.has("power") && (seen.has("heatingCounter") || seen.has("coolingCounter")))
    add("columns", "two-powers", "Give either a power or energy counters. Skip one.");
  recipe.columns.forEach((column, i) => {
    if ((column.capacity ?? null) !== null && !isCounter(column.meaning))
      add(`columns/${i}/capacity`, "no-counter", "Only a counter starts from zero again.");
  });
  recipe.columns.forEach((column, i) => {
    if ((column.pulseValue ?? null) !== null && column.meaning !== "pulses")
      add(`columns/${i}/pulseValue`, "no-pulses", "Only a column of pulses has a pulse's worth.");
    if (column.badWords !== undefined && column.meaning !== "status")
      add(`columns/${i}/badWords`, "no-status", "Only a status column has words.");
  });
  const disproof = dateOrderDisproof(recipe, recognition);
  if (disproof) add("time/format/order", "disproved", disproof);
  const { firstDataLine, headerLine, unitsLine } = recipe.dialect;
  for (const [name, line] of [
    ["headerLine", headerLine] as const,
    ["unitsLine", unitsLine] as const,
  ])
    if (line !== null && line >= firstDataLine)
      add(`dialect/${name}`, "after-data", "This line must stand before the first row of data.");
  return problems;
}

/** Ways to say how much water moved, of which a file is read by one. */
const FLOWS = ["flow", "volumeCounter", "velocity", "pulses"];

const MONTH_PLACE: Readonly<Record<DateOrder, number>> = {
  dayMonthYear: 1,
  monthDayYear: 0,
  yearMonthDay: 1,
};

/** The row of recognition's proof that cannot be read in the order given; null where it can. */
function dateOrderDisproof(recipe: FileRecipe, { proofs }: RecognitionFindings): string | null {
  const { format } = recipe.time;
  if (format.kind !== "calendar" || format.order === null) return null;
  const proof = proofs.find(
    ({ about, certainty }) => about === "dateOrder" && certainty === "proved",
  );
  const parts = proof?.cell?.match(/\d+/g) ?? [];
  const month = Number(parts[MONTH_PLACE[format.order]]);
  const yearElsewhere = parts[0]?.length === 4 && format.order !== "yearMonthDay";
  const readable = month <= 12 && !yearElsewhere;
  if (!proof || parts.length < 3 || readable) return null;
  return `Line ${proof.line} says "${proof.cell}", which cannot be read in this order.`;
}
