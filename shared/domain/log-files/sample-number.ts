import type { DecimalMark } from "./recipe";

/** The number a cell of a sample row holds, or null where it holds none. For looking, not for storing. */
export function sampleNumber(cell: string | undefined, mark: DecimalMark): number | null {
  if (cell === undefined || cell.trim() === "") return null;
  const plain = mark === "," ? cell.replace(/\./g, "").replace(",", ".") : cell;
  const value = Number(plain.replace(/[\s\u00a0\u202f']/g, ""));
  return Number.isFinite(value) ? value : null;
}
