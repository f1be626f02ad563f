import type { RecipeDifferenceView } from "@shared/contracts/recipes";
import { useWords } from "@features/i18n";

/** What a code of a difference is called on screen, by the kind of answer it is about. */
const NAMES = {
  columnMissing: "meaning",
  columnNew: "meaning",
  meaning: "meaning",
  unit: "unit",
  implausible: "unit",
  dateOrder: "order",
} as const;

/** One difference between a file and its recipe, as a sentence. */
export function useDifferenceWords(): (difference: RecipeDifferenceView) => string {
  const t = useWords("recipes");
  const ofImports = useWords("imports");
  const name = (kind: "meaning" | "unit" | "order", code: string): string =>
    ofImports(`columns.${kind}.${code}`, { defaultValue: code });
  return ({ code, column, columnIndex, saved, found, line }) => {
    const kind = code in NAMES ? NAMES[code as keyof typeof NAMES] : null;
    const isFoundCode = kind !== null && code !== "implausible" && code !== "dateOrder";
    return t(`difference.${code}`, {
      column: column || t("edit.unnamed", { number: (columnIndex ?? 0) + 1 }),
      saved: kind === null || saved === null ? saved : name(kind, saved),
      found: isFoundCode && found !== null ? name(kind, found) : found,
      line,
    });
  };
}
