import type { FileRecipe, Separator, TextEncoding } from "@shared/domain/log-files/recipe";

/** What parts the columns: a sign, or the places at which they begin. */
export const COLUMN_SIGNS = [",", ";", "\t", "|", " ", "fixed"] as const;
export type ColumnSign = (typeof COLUMN_SIGNS)[number];

/** The name of each in the words of the File step. */
export const SIGN_NAMES: Readonly<Record<ColumnSign, string>> = {
  ",": "comma",
  ";": "semicolon",
  "\t": "tab",
  "|": "bar",
  " ": "space",
  fixed: "fixed",
};

export function columnSignOf({ dialect }: Pick<FileRecipe, "dialect">): ColumnSign {
  return dialect.columnStarts === undefined ? dialect.separator : "fixed";
}

/** Another sign has the server read the file anew; places of columns are found there. */
export function withColumnSign(recipe: FileRecipe, sign: ColumnSign): FileRecipe {
  const { columnStarts: _, ...dialect } = recipe.dialect;
  return {
    ...recipe,
    dialect:
      sign === "fixed"
        ? { ...dialect, separator: "\t" satisfies Separator, quote: null, columnStarts: [] }
        : { ...dialect, separator: sign },
  };
}

/** @param columnStarts ascending, the first 0 */
export function withColumnStarts(recipe: FileRecipe, columnStarts: readonly number[]): FileRecipe {
  return { ...recipe, dialect: { ...recipe.dialect, columnStarts } };
}

export function withEncoding(recipe: FileRecipe, encoding: TextEncoding): FileRecipe {
  return { ...recipe, dialect: { ...recipe.dialect, encoding } };
}

/** Places as typed, apart by commas or spaces; null where they are none. The first column begins at 0. */
export function readColumnStarts(text: string): readonly number[] | null {
  const parts = text.split(/[\s,;]+/).filter((part) => part !== "");
  const numbers = parts.map((part) => (/^\d{1,4}$/.test(part) ? Number(part) : NaN));
  const starts = numbers[0] === 0 ? numbers : [0, ...numbers];
  const ascend = starts.every((start, i) => i === 0 || start > (starts[i - 1] as number));
  return ascend && starts.length >= 2 && starts.length <= 200 && starts.every((at) => at <= 1000)
    ? starts
    : null;
}
