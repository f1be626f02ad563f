import { useTranslation } from "react-i18next";

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

/** The server's word on one field, translated by its code where there are words for it. */
export function useFieldWords(): (error: FieldError) => string {
  const { t, i18n } = useTranslation("problems", { i18n: i18nInstance });
  return (error) =>
    i18n.language === "en"
      ? error.message
      : t(`fields.${error.code}`, { defaultValue: error.message });
}
