import type { LoopService } from "../energy/power";
import { isChannelMeaning, isCounter } from "./column-units";
import { normalHeader } from "./header-fingerprint";
import { implausibleValue } from "./plausible-unit";
import type { ColumnMeaning, ColumnRecipe, FileRecipe, LoggerClock, TimeRecipe } from "./recipe";
import type { Proof, Question, SampleRow } from "./recognition";

export type RecipeDifferenceCode =
  | "separator"
  | "columnMissing"
  | "columnMoved"
  | "columnNew"
  | "meaning"
  | "unit"
  | "implausible"
  | "decimalMark"
  | "timeFormat"
  | "dateOrder"
  | "clock"
  | "seriesKind";

/** Where a file is not as its recipe says. */
export interface RecipeDifference {
  readonly code: RecipeDifferenceCode;
  readonly column: string | null;
  readonly columnIndex: number | null;
  readonly saved: string | null;
  readonly found: string | null;
  readonly line: number | null;
  /** The file contradicts the recipe, so that somebody must answer; else it is only good to know. */
  readonly asks: boolean;
}

/** What a file says by itself, which a recipe is held against. */
export interface FileEvidence {
  /** As recognition proposed it, no answer of a person in it. */
  readonly proposed: FileRecipe;
  readonly proofs: readonly Proof[];
  readonly asked: readonly Question[];
  readonly sampleRows: readonly SampleRow[];
  readonly service: LoopService | null;
  readonly insideDiameterMm: number | null;
}

export interface RecipeApplication {
  readonly recipe: FileRecipe;
  readonly differences: readonly RecipeDifference[];
  /** What stays open beyond nulls of the recipe, which ask for themselves. */
  readonly questions: readonly Question[];
}

/**
 * Reads a new file like a saved recipe says. The layout is always the file's own: only meanings,
 * units, decimal marks, times and the kind of row are taken over, column by column by their headers.
 * Whatever the file contradicts (a unit it names, an order of dates it disproves, a decimal mark, a
 * clock it states, a column that is not there, readings no loop has) is not taken over: it is listed
 * and stays a question. Nothing of another file's own history comes along, such as meter exchanges.
 */
export function applyRecipe(saved: FileRecipe, file: FileEvidence): RecipeApplication {
  const differences: RecipeDifference[] = [];
  const questions: Question[] = [];
  const { proposed } = file;
  if (saved.dialect.separator !== proposed.dialect.separator)
    differences.push({
      ...whole("separator"),
      saved: saved.dialect.separator,
      found: proposed.dialect.separator,
    });
  const columns = applyColumns(saved, file, differences, questions);
  const time = applyTime(saved.time, file, differences, questions);
  const kind = applyKind(saved, file, columns, differences, questions);
  const { meter: _meter, kindChosen: _kindChosen, ...layout } = proposed;
  const isMetered = columns.some(({ meaning }) => meaning === "power" || isCounter(meaning));
  const positivePower = saved.meter?.positivePower ?? proposed.meter?.positivePower ?? null;
  return {
    recipe: {
      ...layout,
      columns,
      time,
      ...kind,
      ...(saved.alikeChosen === true && { alikeChosen: true }),
      ...(isMetered && { meter: { positivePower, exchangedAt: [] } }),
    },
    differences,
    questions,
  };
}

function whole(code: RecipeDifferenceCode): RecipeDifference {
  const nothing = { column: null, columnIndex: null, saved: null, found: null, line: null };
  return { code, ...nothing, asks: false };
}

function ofColumn(code: RecipeDifferenceCode, { index, header }: ColumnRecipe): RecipeDifference {
  return { ...whole(code), column: header, columnIndex: index };
}

/** Which column of the file each column of the recipe is, by place in the recipe's list. */
function matchColumns(
  saved: readonly ColumnRecipe[],
  own: readonly ColumnRecipe[],
): Map<ColumnRecipe, ColumnRecipe> {
  const found = new Map<ColumnRecipe, ColumnRecipe>();
  const taken = new Set<ColumnRecipe>();
  const take = (column: ColumnRecipe, match: ColumnRecipe | undefined) => {
    if (match === undefined || taken.has(match)) return;
    found.set(column, match);
    taken.add(match);
  };
  const sameCount = saved.length === own.length;
  for (const column of saved) {
    const here = own.find(({ index }) => index === column.index);
    const name = normalHeader(column.header);
    // Columns without names are the same ones only in a row of the same length.
    if (here && normalHeader(here.header) === name && (name !== "" || sameCount))
      take(column, here);
  }
  for (const column of saved) {
    if (found.has(column) || normalHeader(column.header) === "") continue;
    const named = own.filter(
      (other) => !taken.has(other) && normalHeader(other.header) === normalHeader(column.header),
    );
    if (named.length === 1) take(column, named[0]);
  }
  return found;
}

function applyColumns(
  saved: FileRecipe,
  file: FileEvidence,
  differences: RecipeDifference[],
  questions: Question[],
): ColumnRecipe[] {
  const own = file.proposed.columns;
  const matches = matchColumns(saved.columns, own);
  const answers = new Map<number, ColumnRecipe>();
  for (const column of saved.columns) {
    const here = matches.get(column);
    if (here !== undefined) {
      if (here.index !== column.index && column.meaning !== "skip")
        differences.push({
          ...ofColumn("columnMoved", here),
          saved: String(column.index + 1),
          found: String(here.index + 1),
        });
      answers.set(here.index, applyColumn(column, here, file, differences, questions));
    } else if (column.meaning !== "skip") {
      const asks = column.meaning !== "signal";
      differences.push({
        ...ofColumn("columnMissing", column),
        columnIndex: null,
        saved: column.meaning,
        asks,
      });
      if (asks) ask(questions, { code: "columnMeaning", meaning: column.meaning });
    }
  }
  const taken = new Set([...answers.values()].map(({ meaning }) => meaning));
  return own.map((column) => {
    const answer = answers.get(column.index);
    if (answer !== undefined) return answer;
    if (column.meaning === "skip") return column;
    const meaning = taken.has(column.meaning) ? "skip" : column.meaning;
    differences.push({ ...ofColumn("columnNew", column), found: meaning });
    return meaning === "skip" ? { ...column, meaning, unit: null } : column;
  });
}

function applyColumn(
  saved: ColumnRecipe,
  own: ColumnRecipe,
  file: FileEvidence,
  differences: RecipeDifference[],
  questions: Question[],
): ColumnRecipe {
  const { index, header } = own;
  const proofOf = (about: Proof["about"]) =>
    file.proofs.find((proof) => proof.about === about && proof.columnIndex === index);
  const meant = proofOf("columnMeaning");
  const contradicts =
    saved.meaning !== own.meaning && own.meaning !== "skip" && meant?.certainty === "proved";
  if (contradicts) {
    const said = { saved: saved.meaning, found: own.meaning, line: meant.line };
    differences.push({ ...ofColumn("meaning", own), ...said, asks: true });
    const meaning: ColumnMeaning = saved.meaning === "skip" ? own.meaning : saved.meaning;
    ask(questions, { code: "columnMeaning", meaning });
    return own;
  }
  if (saved.meaning === "skip") return { ...own, meaning: "skip", unit: null };
  const taken: ColumnRecipe = { ...saved, index, header };
  if (!isChannelMeaning(saved.meaning)) return { ...taken, decimalMark: own.decimalMark };
  const decimalMark = applyMark(saved, own, proofOf("decimalMark"), differences, questions);
  const column = { ...taken, decimalMark };
  const isNamed = proofOf("columnUnit")?.certainty === "proved" && own.unit !== null;
  if (isNamed && saved.unit !== null && own.unit !== saved.unit) {
    const said = { saved: saved.unit, found: own.unit };
    differences.push({ ...ofColumn("unit", own), ...said, asks: true });
    return { ...column, unit: null };
  }
  const odd = isNamed ? null : implausibleValue(column, file);
  if (odd !== null) {
    const said = { saved: saved.unit, found: odd.cell, line: odd.line };
    differences.push({ ...ofColumn("implausible", own), ...said, asks: true });
    return { ...column, unit: null };
  }
  return column;
}

function applyMark(
  saved: ColumnRecipe,
  own: ColumnRecipe,
  proof: Proof | undefined,
  differences: RecipeDifference[],
  questions: Question[],
): ColumnRecipe["decimalMark"] {
  if (proof === undefined || saved.decimalMark === own.decimalMark) return saved.decimalMark;
  const said = { saved: saved.decimalMark, found: proof.cell ?? own.decimalMark, line: proof.line };
  differences.push({ ...ofColumn("decimalMark", own), ...said, asks: true });
  const place = { columnIndex: own.index, cell: proof.cell ?? "", line: proof.line ?? 0 };
  ask(questions, { code: "decimalMark", ...place });
  return own.decimalMark;
}

function applyTime(
  saved: TimeRecipe,
  { proposed, proofs, asked }: FileEvidence,
  differences: RecipeDifference[],
  questions: Question[],
): TimeRecipe {
  const own = proposed.time;
  const proof = proofs.find(({ about }) => about === "dateOrder");
  let format = own.format;
  if (saved.format.kind !== own.format.kind) {
    const said = { saved: saved.format.kind, found: own.format.kind };
    differences.push({ ...whole("timeFormat"), ...said });
  } else if (saved.format.kind === "calendar" && own.format.kind === "calendar") {
    const { order } = saved.format;
    const question = asked.find(({ code }) => code === "dateOrder");
    const choices = question?.code === "dateOrder" ? question.choices : null;
    const fits =
      order !== null && (own.format.order === order || (choices?.includes(order) ?? false));
    if (fits) format = saved.format;
    else if (order !== null) {
      const found = proof?.cell ?? own.format.order;
      const said = { saved: order, found, line: proof?.line ?? null };
      differences.push({ ...whole("dateOrder"), ...said, asks: true });
      format = { ...own.format, order: null };
    }
  } else format = saved.format;
  return { ...own, format, clock: applyClock(saved.clock, own.clock, differences, questions) };
}

function applyClock(
  saved: LoggerClock | null,
  own: LoggerClock | null,
  differences: RecipeDifference[],
  questions: Question[],
): LoggerClock | null {
  if (own === null || saved === null) return own ?? saved;
  if (clockText(own) === clockText(saved)) return saved;
  const said = { saved: clockText(saved), found: clockText(own) };
  differences.push({ ...whole("clock"), ...said, asks: true });
  ask(questions, { code: "loggerClock" });
  return null;
}

function clockText(clock: LoggerClock): string {
  if (clock.kind === "fixedOffset") return `${clock.kind} ${clock.offsetMinutes}`;
  return clock.kind === "zone" ? `${clock.kind} ${clock.zone}` : clock.kind;
}

/** A kind that somebody chose over the header holds again; else a header that says otherwise asks. */
function applyKind(
  saved: FileRecipe,
  { proposed, asked }: FileEvidence,
  columns: readonly ColumnRecipe[],
  differences: RecipeDifference[],
  questions: Question[],
): Pick<FileRecipe, "seriesKind" | "kindChosen"> {
  const chosen = { kindChosen: true } as const;
  const isSaid = proposed.seriesKind !== "instantaneous";
  if (saved.kindChosen === true || !isSaid || saved.seriesKind === proposed.seriesKind)
    return { seriesKind: saved.seriesKind, ...(saved.kindChosen === true ? chosen : {}) };
  const said = { saved: saved.seriesKind, found: proposed.seriesKind };
  differences.push({ ...whole("seriesKind"), ...said, asks: true });
  const already = asked.find(({ code }) => code === "seriesKind");
  const first = columns.find(({ meaning }) => isChannelMeaning(meaning));
  const place = { columnIndex: first?.index ?? 0, header: first?.header ?? "" };
  ask(questions, already ?? { code: "seriesKind", ...place });
  return { seriesKind: proposed.seriesKind };
}

function ask(questions: Question[], question: Question): void {
  const text = JSON.stringify(question);
  if (!questions.some((other) => JSON.stringify(other) === text)) questions.push(question);
}
