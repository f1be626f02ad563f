import { useTranslation } from "react-i18next";

import type { Language } from "@shared/formats/language";
import { formatNumber, NO_BREAK_SPACE } from "@shared/formats/numbers";
import type { Problem } from "@shared/contracts/contract";

import { i18nInstance } from "./i18n";

/** What a person reads of a refusal. */
export interface ProblemWords {
  readonly title: string;
  readonly detail: string;
  readonly remedy: string;
}

/**
 * The server's words for a refusal, in the language on screen. The server speaks English and names
 * rows and values; other languages use the words kept for the stable code, and fall back to the
 * server's where a code has none.
 */
export function useProblemWords(): (problem: Problem) => ProblemWords {
  const { t, i18n } = useTranslation("problems", { i18n: i18nInstance });
  return (problem) => {
    if (i18n.language === "en") return problem;
    const say = (part: keyof ProblemWords) =>
      t(`${problem.code}.${part}`, { defaultValue: problem[part] });
    return { title: say("title"), detail: say("detail"), remedy: say("remedy") };
  };
}

type FieldError = NonNullable<Problem["errors"]>[number];

/**
 * The server's word on one field, translated by its code where there are words for it. A bound is
 * said in every language, with its limit: the checker's own English is for scripts.
 */
export function useFieldWords(): (error: FieldError) => string {
  const { t, i18n } = useTranslation("problems", { i18n: i18nInstance });
  return (error) => {
    const { bound, code, message, pointer } = error;
    if (bound)
      return t(`bounds.${boundKey(code, bound)}`, {
        limit: limitText(bound, pointer, i18n.language === "de" ? "de" : "en"),
        count: bound.limit,
      });
    return i18n.language === "en" ? message : t(`fields.${code}`, { defaultValue: message });
  };
}

type Bound = NonNullable<FieldError["bound"]>;

function boundKey(code: string, { of, limit, included }: Bound): string {
  const side = code === "too-big" ? "most" : "least";
  if (of === "text" && side === "least" && limit === 1) return "text.needed";
  return of === "number" && !included ? `number.${side}Excluded` : `${of}.${side}`;
}

/** Stored units by the ending of a field's name; first match wins. */
const UNITS: readonly (readonly [ends: RegExp, unit: string])[] = [
  [/M3PerHour$/, "m³/h"],
  [/LPerS$/, "L/s"],
  [/MPerS$/, "m/s"],
  [/MPa$/, "MPa"],
  [/Mm$/, "mm"],
  [/Percent$|^percent$/, "%"],
  [/Kwh$/, "kWh"],
  [/Kw$/, "kW"],
  [/K$/, "K"],
  [/C$/, "°C"],
];

function limitText({ of, limit }: Bound, pointer: string, language: Language): string {
  const places = Math.min(4, (String(limit).split(".")[1] ?? "").length);
  const number = formatNumber(limit, places, language);
  const name = pointer.split("/").at(-1) ?? "";
  const unit = of === "number" ? UNITS.find(([ends]) => ends.test(name))?.[1] : undefined;
  return unit === undefined ? number : `${number}${NO_BREAK_SPACE}${unit}`;
}
