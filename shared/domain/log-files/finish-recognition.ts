import type { LoopService } from "../energy/power";
import { assignColumns, type ColumnAssignment } from "./assign-columns";
import { FLOW_UNITS, needsUnit, unitsOfMeaning } from "./column-units";
import { findDecimalMarks, type MarkFinding } from "./decimal-marks";
import type { ColumnEvidence } from "./column-evidence";
import type { ScanResult } from "./file-scan";
import { saysMean, seriesKindOf, splitName } from "./header-words";
import { statusWordsOf } from "./status-words";
import { preambleClock } from "./preamble-clock";
import { guessTemperatureUnit } from "./temperature-guess";
import type { ColumnRecipe, LoggerClock, MeterRecipe, TimeRecipe } from "./recipe";
import type { HeadRecognition } from "./recognise-head";
import type { Proof, Question, Recognition, SampleRow, Unreadable } from "./recognition";

const SHOWN_SAMPLES = 12;

/**
 * Puts the head and the pass over the whole file together: a recipe, its proofs, and what must be
 * asked. The loop's service says which register a permanent meter counts in; null leaves that open.
 */
export function finishRecognition(
  head: HeadRecognition,
  scan: ScanResult,
  service: LoopService | null = null,
): Recognition | Unreadable {
  if (scan.dataRowCount === 0)
    return { code: "noRows", line: head.dialect.firstDataLine, cell: null };
  const halfDay = scan.time.halfDayUnknown();
  if (halfDay !== null) return { code: "halfDayUnknown", line: halfDay.line, cell: halfDay.cell };

  const {
    columns: assigned,
    asked,
    alike,
    pointSets,
  } = assignColumns(head, scan.columns, {
    sampleRows: scan.sampleRows,
    service,
  });
  const temperatures = assigned.flatMap((column, i) =>
    isTemperature(column.meaning) || alike.includes(i) ? [i] : [],
  );
  const marks = findDecimalMarks(
    scan.columns,
    temperatures,
    head.dialect.separator === "," && !scan.hasQuotes,
  );
  const columns = assigned.map((column, index): ColumnRecipe => ({
    index,
    header: head.header.headers[index] ?? "",
    meaning: column.meaning,
    unit: column.unit,
    decimalMark: (marks[index] as MarkFinding).mark,
  }));

  const questions: Question[] = [];
  const proofs: Proof[] = headProofs(head);
  const time = settleTime(head, scan, proofs, questions);
  if (pointSets.length > 0) questions.push({ code: "whichSet", sets: pointSets });
  if (alike.length > 0)
    questions.push({
      code: "alikeColumns",
      columnIndexes: alike,
      meanings: ["supply", "return"],
    });
  for (const meaning of asked) questions.push({ code: "columnMeaning", meaning });
  const withUnits = columns.map((column) =>
    settleColumn(
      column,
      assigned[column.index] as ColumnAssignment,
      marks[column.index] as MarkFinding,
      scan,
      proofs,
      questions,
    ),
  );
  const counts = withUnits.some(({ meaning }) => meaning === "pulses");
  // Pulses are counted over a step, which ends with the row unless a header says otherwise.
  const seriesKind =
    seriesKindOf(head.header.headers) ?? (counts ? ("meanToLabel" as const) : null);
  if (seriesKind === null) questions.push(...kindQuestion(withUnits));
  const meter = meterOf(withUnits, service);
  if (meter?.positivePower === null) questions.push(...powerQuestion(withUnits, scan, service));
  proofs.push({
    about: "seriesKind",
    columnIndex: null,
    line: head.header.headerLine,
    cell: null,
    certainty: "likely",
  });
  if (
    time.clock === null &&
    time.format.kind !== "epochSeconds" &&
    time.format.kind !== "epochMilliseconds" &&
    scan.time.withOffset < scan.dataRowCount
  ) {
    questions.push({ code: "loggerClock" });
  }
  return {
    recipe: {
      dialect: {
        ...head.dialect,
        encoding: scan.hasInvalidUtf8 ? "windows-1252" : head.dialect.encoding,
        quote: scan.hasQuotes ? (head.dialect.quote ?? '"') : null,
      },
      columns: withUnits,
      time,
      seriesKind: seriesKind ?? "instantaneous",
      ...(meter && { meter }),
    },
    proofs,
    questions,
    firstLines: head.firstLines,
    sampleRows: spread(scan.sampleRows),
    dataRowCount: scan.dataRowCount,
    columnCount: head.columnCount,
    preamble: head.header.preamble,
    words: wordsOf(scan),
    pointSets,
  };
}

function isTemperature(meaning: ColumnRecipe["meaning"]): boolean {
  return meaning === "supply" || meaning === "return" || meaning === "outdoor";
}

/** Words of each column that holds a few different ones. */
function wordsOf({ columns }: ScanResult): NonNullable<Recognition["words"]> {
  return columns.flatMap(({ words }, columnIndex) => {
    if (words.counts.length === 0 || words.isFull) return [];
    const counts = Object.fromEntries(words.words.map((word, i) => [word, words.counts[i] ?? 0]));
    return [{ columnIndex, counts }];
  });
}

/** Rows that a header calls means, and no header says of which step: never taken for moments. */
function kindQuestion(columns: readonly ColumnRecipe[]): Question[] {
  const mean = columns.find(({ meaning, header }) => isRate(meaning) && saysMean(header));
  return mean ? [{ code: "seriesKind", columnIndex: mean.index, header: mean.header }] : [];
}

function isRate(meaning: ColumnRecipe["meaning"]): boolean {
  return (
    meaning === "flow" ||
    meaning === "velocity" ||
    meaning === "supply" ||
    meaning === "return" ||
    meaning === "power"
  );
}

/** In a changeover loop both temperatures tell heating from cooling; without them somebody must. */
function meterOf(
  columns: readonly ColumnRecipe[],
  service: LoopService | null,
): MeterRecipe | null {
  const has = (wanted: ColumnRecipe["meaning"]) =>
    columns.some(({ meaning }) => meaning === wanted);
  const counts = has("volumeCounter") || has("heatingCounter") || has("coolingCounter");
  if (!has("power") && !counts) return null;
  const told = service === "changeover" && has("supply") && has("return");
  return { positivePower: told ? "byTemperature" : null, exchangedAt: [] };
}

function powerQuestion(
  columns: readonly ColumnRecipe[],
  scan: ScanResult,
  service: LoopService | null,
): Question[] {
  const power = columns.find(({ meaning }) => meaning === "power");
  if (service !== "changeover" || !power) return [];
  const range = scan.columns[power.index]?.range(power.decimalMark);
  const [minValue, maxValue] = [range?.min ?? 0, range?.max ?? 0];
  return [{ code: "positivePower", columnIndex: power.index, minValue, maxValue }];
}

function headProofs(head: HeadRecognition): Proof[] {
  const whole = { columnIndex: null, line: null, cell: null };
  const proofs: Proof[] = [
    { about: "encoding", ...whole, ...head.encodingProof, certainty: head.encoding.certainty },
    {
      about: "separator",
      ...whole,
      line: head.dialect.firstDataLine,
      cell: head.dialect.separator,
      // Boundaries are where the head was blank; a row further down may not keep to them.
      certainty: head.dialect.columnStarts ? "likely" : "proved",
    },
  ];
  const { headerLine, unitsLine } = head.header;
  if (headerLine !== null)
    proofs.push({ about: "headerLine", ...whole, line: headerLine, certainty: "likely" });
  if (unitsLine !== null)
    proofs.push({ about: "unitsLine", ...whole, line: unitsLine, certainty: "likely" });
  return proofs;
}

function settleTime(
  head: HeadRecognition,
  scan: ScanResult,
  proofs: Proof[],
  questions: Question[],
): TimeRecipe {
  const clock = statedClock(head);
  if (head.times.kind !== "calendar" && head.times.kind !== "split")
    return { format: { kind: head.times.kind }, clock };
  const columnIndex = head.times.kind === "split" ? head.times.dateIndex : head.times.index;
  const { candidates, proof, stepSeconds } = scan.time.order();
  const { shortYear } = scan.time;
  // A year of two digits is one from 1970 to 2069: likely, and for somebody to see.
  if (shortYear !== null)
    proofs.push({ about: "century", columnIndex, ...shortYear, certainty: "likely" });
  const [only] = candidates;
  if (candidates.length === 1 && only !== undefined) {
    proofs.push({
      about: "dateOrder",
      columnIndex,
      line: proof?.line ?? null,
      cell: proof?.cell ?? null,
      certainty: "proved",
    });
    return { format: { kind: "calendar", order: only }, clock };
  }
  questions.push({
    code: "dateOrder",
    choices: candidates,
    firstCell: scan.firstTimeCell,
    lastCell: scan.lastTimeCell,
    stepSeconds,
  });
  return { format: { kind: "calendar", order: null }, clock };
}

/** A clock the file itself names: a time column headed UTC or GMT, or a line above the header. */
function statedClock(head: HeadRecognition): LoggerClock | null {
  const indices =
    head.times.kind === "split" ? [head.times.dateIndex, head.times.timeIndex] : [head.times.index];
  const words = indices.flatMap((index) => splitName(head.header.headers[index] ?? ""));
  if (words.includes("utc")) return { kind: "utc" };
  return preambleClock(head.header.preamble);
}

function settleColumn(
  column: ColumnRecipe,
  assigned: ColumnAssignment,
  mark: MarkFinding,
  scan: ScanResult,
  proofs: Proof[],
  questions: Question[],
): ColumnRecipe {
  const { index, meaning } = column;
  if (meaning === "skip") return column;
  if (meaning === "status") {
    const { words, counts } = (scan.columns[index] as ColumnEvidence).words;
    const found = Object.fromEntries(words.map((word, i) => [word, counts[i] ?? 0]));
    questions.push({
      code: "statusWords",
      columnIndex: index,
      words: statusWordsOf(found),
    });
    return column;
  }
  if (meaning === "velocity") questions.push({ code: "pointBore", columnIndex: index });
  const place = {
    columnIndex: index,
    line: null,
    cell: column.header === "" ? null : column.header,
  };
  proofs.push({ about: "columnMeaning", ...place, certainty: assigned.certainty });
  const isCalendar =
    scan.time.rows > 0 && (meaning === "time" || meaning === "date" || meaning === "timeOfDay");
  if (isCalendar) return column;
  if (mark.question !== null)
    questions.push({
      code: "decimalMark",
      columnIndex: index,
      cell: mark.question.cell,
      line: mark.question.line,
    });
  else if (mark.proof !== null)
    proofs.push({
      about: "decimalMark",
      columnIndex: index,
      line: mark.proof.line,
      cell: mark.proof.cell,
      certainty: mark.certainty,
    });

  const range = scan.columns[index]?.range(column.decimalMark) ?? null;
  if (meaning === "pulses") {
    const [minValue, maxValue] = [range?.min ?? 0, range?.max ?? 0];
    questions.push({ code: "pulseValue", columnIndex: index, minValue, maxValue });
    return column;
  }
  if (meaning === "flow" && column.unit === null) {
    questions.push({
      code: "flowUnit",
      columnIndex: index,
      minValue: range?.min ?? 0,
      maxValue: range?.max ?? 0,
      choices: FLOW_UNITS,
    });
    return column;
  }
  if ((meaning === "supply" || meaning === "return") && column.unit === null) {
    const unit = guessTemperatureUnit(range);
    if (unit === null)
      questions.push({
        code: "temperatureUnit",
        columnIndex: index,
        minValue: range?.min ?? 0,
        maxValue: range?.max ?? 0,
      });
    else proofs.push({ about: "columnUnit", ...place, certainty: "likely" });
    return { ...column, unit };
  }
  if (column.unit === null && meaning === "outdoor") {
    const [minValue, maxValue] = [range?.min ?? 0, range?.max ?? 0];
    questions.push({ code: "temperatureUnit", columnIndex: index, minValue, maxValue });
    return column;
  }
  if (column.unit === null && needsUnit(meaning)) {
    questions.push({
      code: "columnUnit",
      columnIndex: index,
      minValue: range?.min ?? 0,
      maxValue: range?.max ?? 0,
      choices: unitsOfMeaning(meaning),
    });
    return column;
  }
  if (column.unit !== null) proofs.push({ about: "columnUnit", ...place, certainty: "proved" });
  return column;
}

/** A dozen rows, first and last among them. */
function spread(rows: readonly SampleRow[]): readonly SampleRow[] {
  if (rows.length <= SHOWN_SAMPLES) return rows;
  return Array.from(
    { length: SHOWN_SAMPLES },
    (_, i) => rows[Math.round((i * (rows.length - 1)) / (SHOWN_SAMPLES - 1))] as SampleRow,
  );
}
