/** What somebody typed into a number field: empty, a number, or something unreadable. */
export type TypedNumber =
  | { readonly kind: "empty" }
  | { readonly kind: "number"; readonly value: number }
  | { readonly kind: "unreadable" };

/**
 * Reads a typed number with either decimal mark. Whoever types one mark once means the decimal mark
 * (“18,4” and “18.4” are the same); with both marks, or one repeated, the last different one is the
 * decimal mark and the others must group by threes. Spaces may group too. “1,234” alone is read as
 * 1.234 unless `language` groups with the comma and three digits follow: then it is refused as
 * unreadable rather than guessed wrong by a factor of a thousand.
 */
export function readTypedNumber(typed: string, grouping: "," | "." | null = null): TypedNumber {
  const text = typed.replace(/[\s\u00A0\u202F]/g, "").replace(/[\u2212\u2013]/g, "-");
  if (text === "") return { kind: "empty" };
  if (!/^[-+]?[\d.,]*\d[.,]?$/.test(text)) return { kind: "unreadable" };
  const marks = text.replace(/[^.,]/g, "");
  if (marks.length === 0) return toNumber(text);
  const last = marks[marks.length - 1] as "," | ".";
  const lastRepeats = marks.length > 1 && marks.split("").every((mark) => mark === last);
  if (lastRepeats) return grouped(text, last) ? toNumber(text.split(last).join("")) : unreadable;
  if (marks.length === 1) {
    const ambiguous = last === grouping && /^[-+]?[1-9]\d{0,2}[.,]\d{3}$/.test(text);
    return ambiguous ? unreadable : toNumber(text.replace(last, "."));
  }
  const other = last === "," ? "." : ",";
  if (marks.indexOf(last) !== marks.length - 1) return unreadable;
  const [whole = "", part = ""] = text.split(last);
  if (!grouped(whole, other)) return unreadable;
  return toNumber(`${whole.split(other).join("")}.${part}`);
}

const unreadable: TypedNumber = { kind: "unreadable" };

function grouped(text: string, mark: string): boolean {
  return new RegExp(`^[-+]?\\d{1,3}(\\${mark}\\d{3})+$`).test(text);
}

function toNumber(text: string): TypedNumber {
  const value = Number(text);
  return Number.isFinite(value) ? { kind: "number", value } : unreadable;
}
