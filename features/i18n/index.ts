export { i18nInstance } from "./i18n";
export type { Language } from "@shared/formats/language";
export {
  formatFigure,
  formatNumber,
  localeOf,
  MINUS,
  NO_BREAK_SPACE,
  sensiblePlaces,
  uncertaintyPlaces,
} from "@shared/formats/numbers";
export {
  dayInstant,
  formatDate,
  formatTime,
  needsYear,
  type DateStyle,
} from "@shared/formats/dates";
export { PreferencesProvider, usePreferences } from "./preferences";
export { words, type Namespace } from "./resources";
export { makeFormat, type Format } from "@shared/formats/format";
export { useFluidWords } from "./use-fluid-words";
export { useFormat } from "./use-format";
export { useEvidenceWords } from "./use-evidence-words";
export { useWords } from "./use-words";
export { useFieldWords, useProblemWords, type ProblemWords } from "./use-problem-words";
