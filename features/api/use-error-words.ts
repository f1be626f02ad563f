import { useFieldWords, useProblemWords, useWords } from "@features/i18n";

import { ApiError, NoAnswer } from "./api-error";

/** One or two sentences for an error of a call: what happened and what to do. */
export function useErrorWords(): (error: unknown) => string {
  const inWords = useProblemWords();
  const inFieldWords = useFieldWords();
  const t = useWords("ui");
  return (error) => {
    if (error instanceof ApiError) {
      const fields = error.problem.errors?.map(inFieldWords) ?? [];
      if (fields.length > 0) return fields.join(" ");
      const { detail, remedy } = inWords(error.problem);
      return `${detail} ${remedy}`.trim();
    }
    return t(error instanceof NoAnswer ? "state.noAnswer" : "state.errorDetail");
  };
}
