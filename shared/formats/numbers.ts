import type { Language } from "./language";

/** U+00A0, between a value and its unit so a line never breaks there. */
export const NO_BREAK_SPACE = "\u00A0";
export const MINUS = "\u2212";

const locales: Readonly<Record<Language, string>> = { en: "en-GB", de: "de-DE" };

export function localeOf(language: Language): string {
  return locales[language];
}

const cache = new Map<string, Intl.NumberFormat>();

/**
 * A number as written: comma thousands in English, point in German, a true minus sign.
 * `places` below zero round to tens, hundreds and so on. Null and NaN are unknown: an em dash.
 */
export function formatNumber(value: number | null, places: number, language: Language): string {
  if (value === null || Number.isNaN(value)) return "—";
  const scale = 10 ** Math.max(0, -places);
  const rounded = Math.round(value / scale) * scale;
  const digits = Math.max(0, Math.min(20, places));
  const key = `${language}${digits}`;
  const format =
    cache.get(key) ??
    new Intl.NumberFormat(localeOf(language), {
      minimumFractionDigits: digits,
      maximumFractionDigits: digits,
    });
  cache.set(key, format);
  const text = format.format(places < 0 ? rounded : value).replace("-", MINUS);
  // A value that rounds to nothing has no sign.
  return text.startsWith(MINUS) && !/[1-9]/.test(text) ? text.slice(1) : text;
}

/** Places for a value shown without its ±: about three figures, whole numbers from 1000 up. */
export function sensiblePlaces(value: number): number {
  const size = Math.abs(value);
  if (size >= 1000) return 0;
  if (size >= 10) return 1;
  return 2;
}

/**
 * The place at which a ± with two significant figures stops, and so its value too.
 * 498.7 → −1 (tens), 5.36 → 1, 0.132 → 2, 99.7 rounds up to 100 and stops at tens (−1).
 * Null where there is no usable ±.
 */
export function uncertaintyPlaces(uncertainty: number | null): number | null {
  if (uncertainty === null || !Number.isFinite(uncertainty) || uncertainty <= 0) return null;
  const twoFigures = Number(uncertainty.toPrecision(2));
  return 1 - Math.floor(Math.log10(twoFigures));
}

/** A value and its ± as text, both stopping at the same place. */
export function formatFigure(
  value: number | null,
  uncertainty: number | null,
  language: Language,
  places?: number,
): { value: string; uncertainty: string | null } {
  if (value === null || Number.isNaN(value)) return { value: "—", uncertainty: null };
  const shared = uncertaintyPlaces(uncertainty);
  if (shared === null) {
    return {
      value: formatNumber(value, places ?? sensiblePlaces(value), language),
      uncertainty: null,
    };
  }
  return {
    value: formatNumber(value, shared, language),
    uncertainty: formatNumber(uncertainty, shared, language),
  };
}
