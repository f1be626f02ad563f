import { evidenceValues } from "@shared/formats/evidence-values";
import type { Format } from "@shared/formats/format";

import { useWords } from "./use-words";

interface Coded {
  readonly code: string;
  readonly values: Readonly<Record<string, string | number>>;
}

/** Sentences for what a look at the evidence found, and for why a budget term has its size. */
export function useEvidenceWords(format: Format) {
  const t = useWords("evidence");
  const filled = ({ values }: Coded) => evidenceValues(values, format, (key) => t(key));
  return {
    verdict: (found: Coded): string => t(`verdict.${found.code}`, filled(found)),
    origin: (origin: Coded): string => t(`origin.${origin.code}`, filled(origin)),
  };
}
