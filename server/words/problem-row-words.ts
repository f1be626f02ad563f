import type { ProblemReason } from "@shared/domain/log-files/problem-rows";
import type { Language } from "@shared/formats/language";
import de from "@shared/words/de/problem-rows.json";
import en from "@shared/words/en/problem-rows.json";

export interface ProblemRowWords {
  readonly fileName: string;
  readonly head: readonly string[];
  readonly reason: Readonly<Record<ProblemReason, string>>;
  readonly remedy: Readonly<Record<ProblemReason, string>>;
  more(count: number): string;
  readonly moreRemedy: string;
}

/** The words of a list of problem rows in a language. */
export function problemRowWords(language: Language): ProblemRowWords {
  const words = language === "de" ? de : en;
  const { file, line, text, column, cell, code, reason, remedy } = words.head;
  return {
    ...words,
    head: [file, line, text, column, cell, code, reason, remedy],
    more: (count) => words.more.replace("{{count}}", String(count)),
  };
}
