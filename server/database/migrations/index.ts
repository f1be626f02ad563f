import type { QueryInterface } from "sequelize";
import { people } from "./001-people";
import { places } from "./002-places";
import { importsAndReadings } from "./003-imports-readings";
import { fluids } from "./004-fluids";
import { seriesKinds } from "./005-series-kinds";
import { occupiedHours } from "./006-occupied-hours";
import { evidence } from "./007-evidence";
import { corrections } from "./008-corrections";
import { energyBlocks } from "./008-energy-blocks";
import { meterComparisons } from "./009-meter-comparisons";
import { logFileSources } from "./010-log-file-sources";
import { companionSeries } from "./011-companion-series";
import { importFindings } from "./012-import-findings";
import { recipes } from "./013-recipes";

/**
 * One step of the schema. To add one: write `NNN-subject.ts` beside this file, export a Migration
 * whose `name` is the file's name, and append it to the list. A step that has shipped is never
 * edited: another follows it. MariaDB commits every DDL statement by itself, so a step must be able
 * to start again after a kill (`CREATE TABLE IF NOT EXISTS`).
 */
export interface Migration {
  readonly name: string;
  up(schema: QueryInterface): Promise<void>;
}

export const migrations: readonly Migration[] = [
  people,
  places,
  importsAndReadings,
  fluids,
  seriesKinds,
  occupiedHours,
  evidence,
  energyBlocks,
  corrections,
  meterComparisons,
  logFileSources,
  companionSeries,
  importFindings,
  recipes,
];
