export { i18nInstance, type Language } from "./i18n";
export {
  formatFigure,
  formatNumber,
  localeOf,
  MINUS,
  NO_BREAK_SPACE,
  sensiblePlaces,
  uncertaintyPlaces,
} from "./numbers";
export { dayInstant, formatDate, formatTime, type DateStyle } from "./dates";
export { PreferencesProvider, usePreferences } from "./preferences";
export { words, type Namespace } from "./resources";
export { makeFormat, useFormat, type Format } from "./use-format";
export { useWords } from "./use-words";
export { useFieldWords, useProblemWords, type ProblemWords } from "./use-problem-words";
