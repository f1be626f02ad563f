import type { KindRow } from "./find-dialect";
import { headerMeaning } from "./header-words";
import { splitHeader, unitWord, type UnitWord } from "./unit-words";

/** The lines above the readings, told apart. */
export interface HeaderFinding {
  readonly headerLine: number | null;
  readonly unitsLine: number | null;
  /** One a column; "" without a header. Several header rows are joined by a space, top to bottom. */
  readonly headers: readonly string[];
  readonly units: readonly (UnitWord | null)[];
  readonly preamble: readonly {
    readonly line: number;
    readonly label: string;
    readonly value: string;
  }[];
  /** Cells of the header row up to its last filled one; 0 without a header. */
  readonly headerCellCount: number;
}

const MAX_PREAMBLE = 100;

/**
 * @param above rows before the first row of readings, in file order
 * @param given the header's line where somebody has said it; null where they said there is none
 */
export function findHeader(
  above: readonly KindRow[],
  columnCount: number,
  given?: number | null,
): HeaderFinding {
  let at = above.length - 1;
  let unitsRow: KindRow | null = null;
  let headerRow: KindRow | null = null;
  if (given !== undefined) {
    at = given === null ? -1 : above.findIndex(({ line }) => line === given);
    const below = at < 0 ? undefined : above[at + 1];
    if (below && isUnitsRow(below)) unitsRow = below;
    if (at >= 0) headerRow = above[at--] as KindRow;
  } else {
    if (at >= 0 && isUnitsRow(above[at] as KindRow)) unitsRow = above[at--] as KindRow;
    if (at >= 0 && isHeaderRow(above[at] as KindRow, columnCount))
      headerRow = above[at--] as KindRow;
  }
  // Some loggers put the units above the names.
  if (headerRow !== null && unitsRow === null && at >= 0 && isUnitsRow(above[at] as KindRow))
    unitsRow = above[at--] as KindRow;
  const upper: KindRow[] = [];
  while (headerRow !== null && at >= 0 && isUpperHeaderRow(above[at] as KindRow, columnCount))
    upper.unshift(above[at--] as KindRow);

  const headers: string[] = [];
  const units: (UnitWord | null)[] = [];
  for (let i = 0; i < columnCount; i++) {
    const own = headerRow?.cells[i] ?? "";
    const parts = [...upper.map((row) => row.cells[i] ?? ""), own].filter(
      (part, k, all) => part !== "" && all.indexOf(part) === k,
    );
    headers.push(parts.join(" "));
    const fromRow =
      unitsRow === null ? null : unitWord(stripBrackets(unitsRow.cells[i] ?? ""), true);
    units.push(fromRow ?? unitOf(parts));
  }
  return {
    headerLine: headerRow?.line ?? null,
    unitsLine: unitsRow?.line ?? null,
    headers,
    units: dropProbeLetters(units, headers, unitsRow !== null),
    preamble: above
      .slice(0, at + 1)
      .flatMap(labelAndValue)
      .slice(0, MAX_PREAMBLE),
    headerCellCount: headerRow === null ? 0 : filledCells(headerRow),
  };
}

function unitOf(parts: readonly string[]): UnitWord | null {
  for (let i = parts.length - 1; i >= 0; i--) {
    const { unit } = splitHeader(parts[i] as string);
    if (unit !== null) return unit;
  }
  return null;
}

/** `T_A, T_B, T_C` are three probes, not one in °C: a bare letter counts only where its stem stands alone. */
function dropProbeLetters(
  units: (UnitWord | null)[],
  headers: readonly string[],
  haveUnitsRow: boolean,
): readonly (UnitWord | null)[] {
  if (haveUnitsRow) return units;
  return units.map((unit, i) => {
    const header = (headers[i] as string).toLowerCase();
    const stem = header.slice(0, -1);
    const letter = header.slice(-1);
    const joined = stem.endsWith("_") || stem.endsWith("/");
    if (unit === null || !joined || !"cfk".includes(letter)) return unit;
    const siblings = headers.some(
      (other, k) =>
        k !== i &&
        other.length === header.length &&
        other.toLowerCase().startsWith(stem) &&
        other.toLowerCase() !== header,
    );
    return siblings ? null : unit;
  });
}

function stripBrackets(cell: string): string {
  const first = cell[0];
  return first === "[" || first === "(" ? cell.slice(1, -1) : cell;
}

const TIME_HINTS = /^[ymdhsjt:.\-/ ]{2,20}$/i;

function isUnitsRow(row: KindRow): boolean {
  const filled = row.cells.filter((cell) => cell !== "");
  const units = filled.filter((cell) => unitWord(stripBrackets(cell), true) !== null).length;
  const hints = filled.filter((cell) => TIME_HINTS.test(stripBrackets(cell))).length;
  return (
    units >= 1 &&
    units + hints >= filled.length * 0.6 &&
    filled.every((cell) => headerMeaningWithoutUnit(cell) === null)
  );
}

function headerMeaningWithoutUnit(cell: string): unknown {
  return unitWord(stripBrackets(cell), true) !== null
    ? null
    : headerMeaning(splitHeader(cell).name);
}

function filledCells(row: KindRow): number {
  let count = row.cells.length;
  while (count > 0 && row.cells[count - 1] === "") count--;
  return count;
}

function isHeaderRow(row: KindRow, columnCount: number): boolean {
  const filled = row.cells.filter((cell) => cell !== "").length;
  const words = row.kinds.filter((kind) => kind === "text" || kind === "token").length;
  const recognised = row.cells.filter((cell) => isKnownHeader(cell)).length;
  const wide = row.cellCount >= columnCount - 1 && filled >= Math.min(2, columnCount);
  return (
    words >= filled * 0.6 &&
    (wide ? filled >= columnCount * 0.5 || recognised >= 2 : recognised >= 2)
  );
}

/** A first header row such as `;Flow;Temperature;Temperature`; lines of the preamble have fewer cells or figures. */
function isUpperHeaderRow(row: KindRow, columnCount: number): boolean {
  const filled = row.cells.filter((cell) => cell !== "");
  const named = filled.filter((cell) => {
    const meaning = headerMeaning(splitHeader(cell).name)?.meaning;
    return meaning !== undefined && meaning !== "known";
  }).length;
  const figures = filled.some((cell) => (cell[0] as string) >= "0" && (cell[0] as string) <= "9");
  return (
    columnCount >= 3 &&
    row.cellCount >= columnCount &&
    !figures &&
    named >= Math.max(2, filled.length * 0.5)
  );
}

function isKnownHeader(cell: string): boolean {
  if (cell === "") return false;
  const { name, unit } = splitHeader(cell);
  return unit !== null || headerMeaning(name) !== null;
}

interface LabelledValue {
  readonly line: number;
  readonly label: string;
  readonly value: string;
}

/** `Serial: 50417`, `Serial,50417`, `# Period = 60 s`, and several on a line: `Serial,50417,Bore,82.5 mm`. */
export function labelAndValue(row: Pick<KindRow, "line" | "cells">): readonly LabelledValue[] {
  const cells = row.cells.filter((cell) => cell !== "");
  return groupsOf(cells).flatMap((group) => labelled(row.line, group));
}

/** Cells that belong together: each alone where all are `label: value`, pairs where words and values take turns. */
function groupsOf(cells: readonly string[]): readonly (readonly string[])[] {
  if (cells.length >= 2 && cells.every((cell) => LABEL_AND_VALUE.test(cell)))
    return cells.map((cell) => [cell]);
  const takeTurns =
    cells.length >= 4 &&
    cells.length % 2 === 0 &&
    cells.every((cell, i) => /\d/.test(cell) === (i % 2 === 1));
  if (!takeTurns) return [cells];
  return Array.from({ length: cells.length / 2 }, (_, i) => cells.slice(2 * i, 2 * i + 2));
}

const LABEL_AND_VALUE = /^[#;*"' ]{0,10}\p{L}[^:=]{0,60}[:=]\s*\S/u;

function labelled(line: number, [first = "", ...rest]: readonly string[]): LabelledValue[] {
  const label = first.replace(/^[#;*"' ]{1,10}/, "");
  const mark = [":", "="]
    .map((c) => label.indexOf(c))
    .filter((i) => i > 0)
    .sort((a, b) => a - b)[0];
  // A colon within the first cell splits it, unless that cell ends with it and the value follows.
  if (mark !== undefined && label.slice(mark + 1).trim() !== "") {
    const value = [label.slice(mark + 1).trim(), ...rest].join(" ");
    return [{ line, label: label.slice(0, mark).trim(), value }];
  }
  const bare = mark === undefined ? label.trim() : label.slice(0, mark).trim();
  return bare === "" ? [] : [{ line, label: bare, value: rest.join(" ") }];
}
