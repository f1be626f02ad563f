import deEvidence from "@shared/words/de/evidence.json";
import deWorkings from "@shared/words/de/workings.json";
import enEvidence from "@shared/words/en/evidence.json";
import enWorkings from "@shared/words/en/workings.json";

import deBatches from "./locales/de/batches.json";
import deCharts from "./locales/de/charts.json";
import deCompare from "./locales/de/compare.json";
import deCorrections from "./locales/de/corrections.json";
import deEnergy from "./locales/de/energy.json";
import deFindings from "./locales/de/findings.json";
import deImports from "./locales/de/imports.json";
import deInstallation from "./locales/de/installation.json";
import deKit from "./locales/de/kit.json";
import deLoad from "./locales/de/load.json";
import deLoops from "./locales/de/loops.json";
import dePeople from "./locales/de/people.json";
import deLogs from "./locales/de/logs.json";
import dePlaces from "./locales/de/places.json";
import deProblems from "./locales/de/problems.json";
import deRecipes from "./locales/de/recipes.json";
import deShell from "./locales/de/shell.json";
import deToday from "./locales/de/today.json";
import deUi from "./locales/de/ui.json";
import enBatches from "./locales/en/batches.json";
import enCharts from "./locales/en/charts.json";
import enCompare from "./locales/en/compare.json";
import enCorrections from "./locales/en/corrections.json";
import enEnergy from "./locales/en/energy.json";
import enFindings from "./locales/en/findings.json";
import enImports from "./locales/en/imports.json";
import enInstallation from "./locales/en/installation.json";
import enKit from "./locales/en/kit.json";
import enLoad from "./locales/en/load.json";
import enLoops from "./locales/en/loops.json";
import enPeople from "./locales/en/people.json";
import enLogs from "./locales/en/logs.json";
import enPlaces from "./locales/en/places.json";
import enProblems from "./locales/en/problems.json";
import enRecipes from "./locales/en/recipes.json";
import enShell from "./locales/en/shell.json";
import enToday from "./locales/en/today.json";
import enUi from "./locales/en/ui.json";

/**
 * One namespace per feature, one line each; English and German have the same keys. Words that the
 * server prints too stand in shared/words.
 */
export const words = {
  batches: { en: enBatches, de: deBatches },
  charts: { en: enCharts, de: deCharts },
  compare: { en: enCompare, de: deCompare },
  corrections: { en: enCorrections, de: deCorrections },
  energy: { en: enEnergy, de: deEnergy },
  evidence: { en: enEvidence, de: deEvidence },
  findings: { en: enFindings, de: deFindings },
  imports: { en: enImports, de: deImports },
  installation: { en: enInstallation, de: deInstallation },
  kit: { en: enKit, de: deKit },
  load: { en: enLoad, de: deLoad },
  loops: { en: enLoops, de: deLoops },
  people: { en: enPeople, de: dePeople },
  logs: { en: enLogs, de: deLogs },
  places: { en: enPlaces, de: dePlaces },
  problems: { en: enProblems, de: deProblems },
  recipes: { en: enRecipes, de: deRecipes },
  shell: { en: enShell, de: deShell },
  today: { en: enToday, de: deToday },
  ui: { en: enUi, de: deUi },
  workings: { en: enWorkings, de: deWorkings },
} as const;

export type Namespace = keyof typeof words;
