import type { Format } from "../formats/format";

/** A word by its key, with values filled in; whoever calls brings a language. */
export type Words = (key: string, values?: Readonly<Record<string, unknown>>) => string;

/** A value with so many significant figures: 14,930, 1.165 and 4.870 with four, as with a pencil. */
export function significant(value: number, format: Format, figures = 4): string {
  if (value === 0 || !Number.isFinite(value)) return format.number(value, 0);
  const places = figures - 1 - Math.floor(Math.log10(Math.abs(value)));
  return format.number(value, places);
}
